package formulary

// The records below mirror the formulary file key by key. They hold text; the
// reader turns it into quantities and refuses what does not read (read.go).

// fileRecord is one formulary file.
type fileRecord struct {
	Name    string                  `toml:"name"`
	Version string                  `toml:"version"`
	Sources map[string]sourceRecord `toml:"sources"`
	Drugs   []drugRecord            `toml:"drug"`
}

// sourceRecord is one entry of the list of sources.
type sourceRecord struct {
	Title string `toml:"title"` // spelled out, with year where seen; no brand, no company
	// A label, guideline, standard, paper; B handbook, hospital guide; C weak; P
	// common practice, no source.
	Grade string `toml:"grade"`
}

// figureRecord is one figure with where it comes from.
type figureRecord struct {
	Value      string `toml:"value"`
	Source     string `toml:"source"`
	Unverified bool   `toml:"unverified"`
}

// textRecord is a sentence with where it comes from.
type textRecord struct {
	Text       string `toml:"text"`
	Source     string `toml:"source"`
	Unverified bool   `toml:"unverified"`
}

type drugRecord struct {
	Name           string                `toml:"name"`  // INN, lower case
	Names          map[string]string     `toml:"names"` // label name by style (uk, us, si) where unlike name
	Also           []string              `toml:"also"`  // other names that find it
	ATC            string                `toml:"atc"`
	Class          string                `toml:"class"`      // code of label-rules.md 1.3
	Counted        string                `toml:"counted"`    // mass, units
	CountedAs      string                `toml:"counted_as"` // "base", "chloride"…: what the amount refers to
	ShowAs         bool                  `toml:"show_as"`    // print counted_as on the label (noradrenaline)
	Flags          []string              `toml:"flags"`
	Cautions       []textRecord          `toml:"caution"`
	NoInfusion     *textRecord           `toml:"never_as_infusion"`
	NoBolus        *textRecord           `toml:"never_as_bolus"`
	Substance      *figureRecord         `toml:"substance"` // "4 mmol/g"
	Salt           *saltRecord           `toml:"salt"`      // where the label counts base and the pack holds salt
	Presentations  []presentationRecord  `toml:"presentation"`
	Concentrations []concentrationRecord `toml:"concentration"`
	Doses          []doseRecord          `toml:"dose"`
	Infusions      []infusionRecord      `toml:"infusion"`
	Standards      []standardRecord      `toml:"standard"`
	Stability      []stabilityRecord     `toml:"stability"`
}

// saltRecord says how much salt there is for one mg as counted.
type saltRecord struct {
	Name       string `toml:"name"`   // "acid tartrate"
	PerMg      string `toml:"per_mg"` // "2 mg"
	Source     string `toml:"source"`
	Unverified bool   `toml:"unverified"`
}

type presentationRecord struct {
	ID           string          `toml:"id"`        // "ampoule 20 mg in 10 mL"
	Container    string          `toml:"container"` // ampoule, vial, syringe
	Form         string          `toml:"form"`      // solution, emulsion, powder
	Amount       string          `toml:"amount"`
	Volume       string          `toml:"volume"` // of a solution; blank for a powder
	Source       string          `toml:"source"`
	Unverified   bool            `toml:"unverified"`
	Assay        *figureRecord   `toml:"assay"` // half width, "10 %"
	Add          string          `toml:"add"`   // powder: fluid added to one container
	AddFluids    []string        `toml:"add_fluids"`
	Displacement *figureRecord   `toml:"displacement"`  // "0.2 mL", or "negligible"
	SecondName   string          `toml:"second_name"`   // a second drug in the same container
	SecondAmount string          `toml:"second_amount"` // per container
	AgeFrom      string          `toml:"age_from"`      // not for younger patients; blank: no bound
	Uses         []string        `toml:"uses"`          // bolus, infusion
	Neat         bool            `toml:"neat"`          // may be given as supplied (a powder: as mixed)
	Diluents     []diluentRecord `toml:"diluent"`
	Forbidden    []diluentRecord `toml:"forbidden_diluent"`
	Notes        []textRecord    `toml:"note"`
}

type diluentRecord struct {
	Name       string `toml:"name"`
	Reason     string `toml:"reason"` // for a forbidden one
	Source     string `toml:"source"`
	Unverified bool   `toml:"unverified"`
}

type concentrationRecord struct {
	Use  string        `toml:"use"`  // bolus, infusion
	Line string        `toml:"line"` // any, peripheral, central
	Low  *figureRecord `toml:"low"`
	High *figureRecord `toml:"high"`
}

type doseRecord struct {
	For       string        `toml:"for"` // "induction"
	Routes    []string      `toml:"routes"`
	AgeFrom   string        `toml:"age_from"` // "18 years", "1 month"; blank: birth
	AgeTo     string        `toml:"age_to"`   // up to but not including; blank: no end
	By        string        `toml:"by"`       // actual, ideal, adjusted, lean, surface, none
	BySource  string        `toml:"by_source"`
	HardLow   *figureRecord `toml:"hard_low"`
	UsualLow  *figureRecord `toml:"usual_low"`
	UsualHigh *figureRecord `toml:"usual_high"`
	SoftHigh  *figureRecord `toml:"soft_high"`
	HardHigh  *figureRecord `toml:"hard_high"`
	TotalMax  *figureRecord `toml:"total_max"` // absolute, "60 mg"
}

type infusionRecord struct {
	For       string        `toml:"for"`
	Routes    []string      `toml:"routes"`
	AgeFrom   string        `toml:"age_from"`
	AgeTo     string        `toml:"age_to"`
	By        string        `toml:"by"`
	BySource  string        `toml:"by_source"`
	HardLow   *figureRecord `toml:"hard_low"`
	UsualLow  *figureRecord `toml:"usual_low"`
	UsualHigh *figureRecord `toml:"usual_high"`
	SoftHigh  *figureRecord `toml:"soft_high"`
	HardHigh  *figureRecord `toml:"hard_high"`
}

type standardRecord struct {
	ID           string `toml:"id"` // "4 mg in 50 mL"
	Mix          string `toml:"mix"`
	Diluent      string `toml:"diluent"` // blank: neat
	Line         string `toml:"line"`
	Jurisdiction string `toml:"jurisdiction"`
	Source       string `toml:"source"`
	Unverified   bool   `toml:"unverified"`
}

type stabilityRecord struct {
	Diluent    string `toml:"diluent"` // a diluent's name, "neat" or "any"
	Storage    string `toml:"storage"` // room, refrigerator
	Hours      string `toml:"hours"`   // "24 h"
	Source     string `toml:"source"`
	Unverified bool   `toml:"unverified"`
}
