package order

// The records mirror the order file key by key. They hold text; numbers and
// times become quantities in read.go, where a fault can name its place.
// A value of type any takes a text or a TOML date or time.

type fileRecord struct {
	Session  sessionRecord   `toml:"session"`
	Site     siteRecord      `toml:"site"`
	Patients []patientRecord `toml:"patient"`
}

type sessionRecord struct {
	Place    string `toml:"place"`
	Date     any    `toml:"date"`
	Prepared any    `toml:"prepared"`
	Zone     string `toml:"zone"`
	Preparer string `toml:"preparer"`
	Invented bool   `toml:"invented"`
}

type siteRecord struct {
	Style          string   `toml:"style"`
	BolusUseBy     string   `toml:"bolus_use_by"`
	InfusionUseBy  string   `toml:"infusion_use_by"`
	Smallest       string   `toml:"smallest_volume"`
	Tolerance      string   `toml:"tolerance"`
	PumpStep       string   `toml:"pump_step"`
	Barrels        []string `toml:"barrels"`
	Jurisdiction   string   `toml:"jurisdiction"`
	TallMan        string   `toml:"tall_man"`
	DualNames      bool     `toml:"dual_names"`
	Edition        string   `toml:"edition"`
	Anticoagulants string   `toml:"anticoagulants"`

	Products []productRecord `toml:"gtin"`
}

type productRecord struct {
	Number        string `toml:"number"`
	Drug          string `toml:"drug"`
	Concentration string `toml:"concentration"`
	Volume        string `toml:"volume"`
}

type patientRecord struct {
	ID        string           `toml:"id"`
	Name      string           `toml:"name"`
	Sex       string           `toml:"sex"`
	Age       string           `toml:"age"`
	Height    string           `toml:"height"`
	Weight    string           `toml:"weight"`
	Weighed   any              `toml:"weighed"`
	Estimated bool             `toml:"estimated"`
	Frail     bool             `toml:"frail"`
	Syringes  []syringeRecord  `toml:"syringe"`
	Infusions []infusionRecord `toml:"infusion"`
}

// commonRecord is what a syringe and an infusion share. The decoder lays the
// keys of an embedded struct beside the others.
type commonRecord struct {
	Drug           string `toml:"drug"`
	Presentation   string `toml:"presentation"`
	Indication     string `toml:"indication"`
	Diluent        string `toml:"diluent"`
	Route          string `toml:"route"`
	Size           string `toml:"size"`
	Batch          string `toml:"batch"`
	Expiry         any    `toml:"expiry"`
	AcceptedBy     string `toml:"accepted_by"`
	AcceptedReason string `toml:"accepted_reason"`
}

type syringeRecord struct {
	commonRecord
	Dose          string `toml:"dose"`
	Amount        string `toml:"amount"`
	Concentration string `toml:"concentration"`
	Volume        string `toml:"volume"`
	Doses         any    `toml:"doses"`
	Dilute        bool   `toml:"dilute_if_needed"`
}

type infusionRecord struct {
	commonRecord
	Standard string `toml:"standard"`
	Mix      string `toml:"mix"`
	Method   string `toml:"method"`
	Line     string `toml:"line"`
	Start    string `toml:"start"`
	From     string `toml:"from"`
	To       string `toml:"to"`

	Concentration string `toml:"concentration"`
	Volume        string `toml:"volume"`
	Hours         string `toml:"hours"`
	Priming       string `toml:"priming"`
	DeadSpace     string `toml:"dead_space"`
	Mixture       string `toml:"mixture"`
	Each          string `toml:"one_ml_per_hour"`
}

// knownKeys lists every key of the records with its table; a test holds the
// two together.
func knownKeys() []string {
	keys := []string{"session", "site", "site.gtin", "patient", "patient.syringe", "patient.infusion"}
	for _, t := range []struct {
		table string
		names []string
	}{
		{"session", []string{"place", "date", "prepared", "zone", "preparer", "invented"}},
		{"site", []string{"style", "bolus_use_by", "infusion_use_by", "smallest_volume", "tolerance", "pump_step", "barrels", "jurisdiction", "tall_man", "dual_names", "edition", "anticoagulants"}},
		{"site.gtin", []string{"number", "drug", "concentration", "volume"}},
		{"patient", []string{"id", "name", "sex", "age", "height", "weight", "weighed", "estimated", "frail"}},
		{"patient.syringe", append(commonKeys(), "dose", "amount", "concentration", "volume", "doses", "dilute_if_needed")},
		{"patient.infusion", append(commonKeys(), "standard", "mix", "method", "line", "start", "from", "to", "concentration", "volume", "hours",
			"priming", "dead_space", "mixture", "one_ml_per_hour")},
	} {
		for _, name := range t.names {
			keys = append(keys, t.table+"."+name)
		}
	}
	return keys
}

func commonKeys() []string {
	return []string{"drug", "presentation", "indication", "diluent", "route", "size", "batch", "expiry", "accepted_by", "accepted_reason"}
}
