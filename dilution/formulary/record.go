package formulary

// The records below mirror the formulary file key by key. They hold text; the
// reader turns it into quantities and refuses what does not read (read.go).

// Each field's comment says what it holds and ends in an example; drawup
// formulary schema prints both (schema.go reads this very file).

// fileRecord is one formulary file. A key that is not listed is refused.
type fileRecord struct {
	// Name of the formulary; all its files carry the same. Example: "starter formulary"
	Name string `toml:"name"`
	// Version as the site counts it; all files carry the same. Example: "2026.12"
	Version string `toml:"version"`
	// The formulary that this file builds on: a drug here replaces the one there whole. Blank: the file stands alone. Example: "starter formulary"
	Base string `toml:"base"`
	// Sources by key. Example: SMPC-3675 = { title = "UK SmPC, adrenaline 0.1 mg/mL, 2018", grade = "A", jurisdiction = "UK" }
	Sources map[string]sourceRecord `toml:"sources"`
	// One block for each drug. Example: [[drug]]
	Drugs []drugRecord `toml:"drug"`
	// Drugs that may share one syringe; all others may not. Example: [[mix]]
	Mixes []mixRecord `toml:"mix"`
	// Drugs that must never share a syringe, with the reason to print. Example: [[never_mix]]
	NeverMixes []neverMixRecord `toml:"never_mix"`
	// Names with their confusable letters in capitals, one list a jurisdiction. Example: [[tall_man]]
	TallMan []tallManRecord `toml:"tall_man"`
}

// sourceRecord is one entry of the list of sources.
type sourceRecord struct {
	// Title spelled out, with the year where seen; no brand, no company. Example: "UK SmPC, noradrenaline 1 mg/mL (base) concentrate, 2023"
	Title string `toml:"title"`
	// A label, guideline, standard, paper; B handbook, hospital guide; C weak; P common practice, no source. Example: "A"
	Grade string `toml:"grade"`
	// Where it holds: UK, US, EU, IE, DE, CH, AU, NZ, CA, or "international" for standards and papers. Example: "UK"
	Jurisdiction string `toml:"jurisdiction"`
}

// figureRecord is one figure with where it comes from.
type figureRecord struct {
	// The figure with its unit. Example: "0.3 mg/kg"
	Value string `toml:"value"`
	// Key of the source. Example: "SMPC-3675"
	Source string `toml:"source"`
	// Nobody has verified it; said on every paper that rests on it. Example: true
	Unverified bool `toml:"unverified"`
	// Where the figure holds, when unlike its source. Example: "US"
	Jurisdiction string `toml:"jurisdiction"`
	// Who verified it against the source, and when; blank in the starter. Example: "A. Pharmacist, 2026-12-01"
	VerifiedBy string `toml:"verified_by"`
	// In a site's file: why a limit of the base is loosened; asked for then. Example: "ventilated adults only, medicines committee 2026-11"
	Reason string `toml:"reason"`
}

// textRecord is a sentence with where it comes from.
type textRecord struct {
	// The sentence as it is printed. Example: "Destroyed by bicarbonate and other alkali."
	Text string `toml:"text"`
	// Key of the source. Example: "HID-epi"
	Source string `toml:"source"`
	// Nobody has verified it. Example: true
	Unverified bool `toml:"unverified"`
}

// drugRecord is one drug.
type drugRecord struct {
	// INN, or the name it is filed under, in lower case. Example: "adrenaline"
	Name string `toml:"name"`
	// Name on paper by house style (uk, us, si), where unlike name. Example: { us = "epinephrine" }
	Names map[string]string `toml:"names"`
	// Other names that find it: US, former British, spellings. Example: ["epinephrine"]
	Also []string `toml:"also"`
	// ATC code of the fifth level. Example: "C01CA24"
	ATC string `toml:"atc"`
	// Code of the label class. Example: "ADR"
	Class string `toml:"class"`
	// What amounts are counted by: mass, units, substance. Example: "mass"
	Counted string `toml:"counted"`
	// What the amount refers to. Example: "base"
	CountedAs string `toml:"counted_as"`
	// Print counted_as on the label. Example: true
	ShowAs bool `toml:"show_as"`
	// Chemical formula of what is counted; verify works molar masses from it. Example: "C8H11NO3"
	Formula string `toml:"formula"`
	// Marks: high alert, controlled, vesicant … Example: ["high alert", "vesicant"]
	Flags []string `toml:"flags"`
	// Drugs that whoever plans may be pointed to when this one is refused. Example: ["phenylephrine"]
	Substitutes []string `toml:"substitutes"`
	// Sentences that go on the papers. Example: [{ text = "Pink or brown: throw it away.", source = "HID-epi" }]
	Cautions []textRecord `toml:"caution"`
	// Why it is never given as an infusion. Example: { text = "suppresses the adrenals", source = "ETO3" }
	NoInfusion *textRecord `toml:"never_as_infusion"`
	// Why it is never given as a bolus. Example: { text = "not licensed as a bolus", source = "NOR-b" }
	NoBolus *textRecord `toml:"never_as_bolus"`
	// Amount of substance in a gram as counted. Example: { value = "4.06 mmol/g", source = "NMT-mg" }
	Substance *figureRecord `toml:"substance"`
	// How many of the counted ion one formula holds, when not one. Example: 1
	IonsPerFormula int64 `toml:"ions_per_formula"`
	// The salt in the pack where the drug is counted as base. Example: { name = "acid tartrate", per_mg = "2 mg", source = "NOR-b" }
	Salt *saltRecord `toml:"salt"`
	// One block for each ampoule, vial or syringe as supplied. Example: [[drug.presentation]]
	Presentations []presentationRecord `toml:"presentation"`
	// Bounds of concentration in the syringe. Example: [[drug.concentration]]
	Concentrations []concentrationRecord `toml:"concentration"`
	// Limits of single doses. Example: [[drug.dose]]
	Doses []doseRecord `toml:"dose"`
	// Limits of dose rates. Example: [[drug.infusion]]
	Infusions []infusionRecord `toml:"infusion"`
	// Maxima of a local anaesthetic that add up across drugs and sites. Example: [[drug.local_maximum]]
	LocalMaxima []localMaximumRecord `toml:"local_maximum"`
	// Concentrations that a published list has settled. Example: [[drug.standard]]
	Standards []standardRecord `toml:"standard"`
	// How long a preparation may be kept. Example: [[drug.stability]]
	Stability []stabilityRecord `toml:"stability"`
	// In a site's file: limits of the base that are gone here, each with why. Example: [[drug.taken_away]]
	TakenAway []takenAwayRecord `toml:"taken_away"`
}

// saltRecord says how much salt there is for one mg as counted.
type saltRecord struct {
	// Name of the salt, water included. Example: "acid tartrate monohydrate"
	Name string `toml:"name"`
	// Mass of salt for 1 mg as counted. Example: "2 mg"
	PerMg string `toml:"per_mg"`
	// Formula of the salt, its parts parted by points; verify works the factor from it. Example: "C8H11NO3.C4H6O6.H2O"
	Formula string `toml:"formula"`
	// How many of the counted molecule one formula of the salt holds, when not one. Example: 2
	Holds int64 `toml:"holds"`
	// Key of the source. Example: "NOR-b"
	Source string `toml:"source"`
	// Nobody has verified it. Example: true
	Unverified bool `toml:"unverified"`
}

// presentationRecord is one ampoule, vial or syringe as supplied.
type presentationRecord struct {
	// Container, amount and volume; what an order names. Example: "ampoule 20 mg in 10 mL"
	ID string `toml:"id"`
	// ampoule, vial, syringe, bag or bottle. Example: "ampoule"
	Container string `toml:"container"`
	// solution, emulsion or powder. Example: "solution"
	Form string `toml:"form"`
	// Amount of drug in one container, as counted. Example: "20 mg"
	Amount string `toml:"amount"`
	// Volume of one container; of a powder the volume that is obtained after mixing, where the label says it in place of a displacement. Example: "10 mL"
	Volume string `toml:"volume"`
	// Key of the source of the contents. Example: "ETO-1"
	Source string `toml:"source"`
	// Nobody has verified the contents. Example: true
	Unverified bool `toml:"unverified"`
	// Half width of the assay limits. Example: { value = "10 %", source = "BP-ADR" }
	Assay *figureRecord `toml:"assay"`
	// Powder: volume of fluid added to one container. Example: "20 mL"
	Add string `toml:"add"`
	// Powder: fluids that may be added. Example: ["water for injections"]
	AddFluids []string `toml:"add_fluids"`
	// Powder: volume that the powder itself takes, or "negligible". Example: { value = "0.2 mL", source = "HID-x" }
	Displacement *figureRecord `toml:"displacement"`
	// Name of a second drug in the same container. Example: "glycopyrronium"
	SecondName string `toml:"second_name"`
	// Its amount in one container. Example: "0.5 mg"
	SecondAmount string `toml:"second_amount"`
	// Not for patients younger than this. Example: "3 years"
	AgeFrom string `toml:"age_from"`
	// bolus, infusion, or both. Example: ["bolus", "infusion"]
	Uses []string `toml:"uses"`
	// Routes that this presentation may be given by; blank: as the doses say. Example: ["IV"]
	Routes []string `toml:"routes"`
	// May be given as supplied (a powder: as mixed). Example: true
	Neat bool `toml:"neat"`
	// Drawn from more than once. Example: true
	MultiDose bool `toml:"multi_dose"`
	// It is preserved, with what: never epidural or intrathecal. Example: { text = "benzyl alcohol 9 mg/mL", source = "MID4" }
	Preserved *textRecord `toml:"preserved"`
	// Why it may not go into a pump. Example: { text = "the syringe does not fit a syringe pump", source = "PHE-sg" }
	NotForPump *textRecord `toml:"not_for_pump"`
	// What the container holds beyond its stated volume; a note, never counted. Example: { value = "0.2 mL", source = "HID-tei" }
	Overfill *figureRecord `toml:"overfill"`
	// Diluents that may be used. Example: [{ name = "glucose 5 %", source = "GUH-nor" }]
	Diluents []diluentRecord `toml:"diluent"`
	// Diluents that must not be used. Example: [{ name = "sodium chloride 0.9 %", why = "precipitation", reason = "forms a precipitate", source = "GUH-ami" }]
	Forbidden []diluentRecord `toml:"forbidden_diluent"`
	// Sentences about this presentation. Example: [{ text = "Shake before use.", source = "PRO1" }]
	Notes []textRecord `toml:"note"`
}

// diluentRecord is a fluid that may, or may not, be used.
type diluentRecord struct {
	// Name of the fluid. Example: "glucose 5 %"
	Name string `toml:"name"`
	// Of a forbidden one: precipitation, degradation, emulsion cracking, adsorption, haemolysis, or not listed. Example: "precipitation"
	Why string `toml:"why"`
	// Of a forbidden one: the sentence to print. Example: "the emulsion breaks"
	Reason string `toml:"reason"`
	// Only from this concentration up. Example: { value = "20 mg/mL", source = "THI3" }
	Low *figureRecord `toml:"low"`
	// Only up to this concentration. Example: { value = "0.08 mg/mL", source = "DZS" }
	High *figureRecord `toml:"high"`
	// Key of the source. Example: "GUH-nor"
	Source string `toml:"source"`
	// Nobody has verified it. Example: true
	Unverified bool `toml:"unverified"`
}

// concentrationRecord bounds what a syringe may hold.
type concentrationRecord struct {
	// bolus or infusion. Example: "infusion"
	Use string `toml:"use"`
	// any, peripheral or central. Example: "central"
	Line string `toml:"line"`
	// Routes that the row is for; blank: every route that no other row of this use names. Example: ["IM"]
	Routes []string `toml:"routes"`
	// Indication that the row is for; blank: every one that no other row names. Example: "after birth"
	For string `toml:"for"`
	// From this age; blank: birth. Example: "1 month"
	AgeFrom string `toml:"age_from"`
	// Up to this age, which is not included; blank: no end. Example: "18 years"
	AgeTo string `toml:"age_to"`
	// Lowest concentration. Example: { value = "20 microgram/mL", source = "S4S16" }
	Low *figureRecord `toml:"low"`
	// Highest concentration. Example: { value = "320 microgram/mL", source = "ICS16" }
	High *figureRecord `toml:"high"`
}

// doseRecord is one row of limits of single doses.
type doseRecord struct {
	// Indication. Example: "induction"
	For string `toml:"for"`
	// Routes. Example: ["IV"]
	Routes []string `toml:"routes"`
	// From this age; blank: birth. Example: "18 years"
	AgeFrom string `toml:"age_from"`
	// Up to this age, which is not included; blank: no end. Example: "65 years"
	AgeTo string `toml:"age_to"`
	// The row is for the frail alone, and goes before the others then. Example: true
	Frail bool `toml:"frail"`
	// Weight that a dose per kg goes by: actual, ideal, adjusted, lean, surface, none. Example: "lean"
	By string `toml:"by"`
	// Key of the source that says so. Example: "G9"
	BySource string `toml:"by_source"`
	// Refused below. Example: { value = "0.1 mg/kg", source = "ETO1" }
	HardLow *figureRecord `toml:"hard_low"`
	// Caution below. Example: { value = "0.15 mg/kg", source = "ETO2" }
	UsualLow *figureRecord `toml:"usual_low"`
	// Caution above. Example: { value = "0.3 mg/kg", source = "ETO2" }
	UsualHigh *figureRecord `toml:"usual_high"`
	// Above only with a name and a reason. Example: { value = "0.4 mg/kg", source = "ETO2" }
	SoftHigh *figureRecord `toml:"soft_high"`
	// Refused above. Example: { value = "0.6 mg/kg", source = "ETO1" }
	HardHigh *figureRecord `toml:"hard_high"`
	// Highest amount in one dose, whatever the weight. Example: { value = "60 mg", source = "ETO2" }
	TotalMax *figureRecord `toml:"total_max"`
	// Highest first dose. Example: { value = "2.5 mg", source = "MID4" }
	FirstMax *figureRecord `toml:"first_max"`
	// Highest repeat. Example: { value = "1 mg", source = "MID1" }
	RepeatMax *figureRecord `toml:"repeat_max"`
	// Shortest time to a repeat. Example: { value = "2 min", source = "MID4" }
	RepeatAfter *figureRecord `toml:"repeat_after"`
	// Highest amount of all doses together in 24 hours. Example: { value = "4 g", source = "PAR1" }
	DayMax *figureRecord `toml:"day_max"`
	// Highest amount of all doses of a course together. Example: { value = "7.5 mg", source = "MID1" }
	CourseMax *figureRecord `toml:"course_max"`
}

// infusionRecord is one row of limits of dose rates.
type infusionRecord struct {
	// Indication. Example: "sedation"
	For string `toml:"for"`
	// Routes. Example: ["IV"]
	Routes []string `toml:"routes"`
	// From this age; blank: birth. Example: "18 years"
	AgeFrom string `toml:"age_from"`
	// Up to this age, which is not included; blank: no end. Example: "65 years"
	AgeTo string `toml:"age_to"`
	// The row is for the frail alone, and goes before the others then. Example: true
	Frail bool `toml:"frail"`
	// Weight that a rate per kg goes by: actual, ideal, adjusted, lean, none. Example: "actual"
	By string `toml:"by"`
	// Key of the source that says so. Example: "G9"
	BySource string `toml:"by_source"`
	// Refused below. Example: { value = "0.01 microgram/kg/min", source = "ALM" }
	HardLow *figureRecord `toml:"hard_low"`
	// Caution below. Example: { value = "0.05 microgram/kg/min", source = "ALM" }
	UsualLow *figureRecord `toml:"usual_low"`
	// Caution above. Example: { value = "0.5 microgram/kg/min", source = "ALM" }
	UsualHigh *figureRecord `toml:"usual_high"`
	// Above only with a name and a reason. Example: { value = "1 microgram/kg/min", source = "ALM" }
	SoftHigh *figureRecord `toml:"soft_high"`
	// Refused above. Example: { value = "2 microgram/kg/min", source = "ALM" }
	HardHigh *figureRecord `toml:"hard_high"`
	// Highest amount in all, whatever the rate. Example: { value = "60 mg/kg", source = "X" }
	CourseMax *figureRecord `toml:"course_max"`
	// Longest time that it may run. Example: { value = "48 h", source = "HID-dex" }
	Longest *figureRecord `toml:"longest"`
}

// localMaximumRecord is a maximum of a local anaesthetic; fractions of maxima
// add up across drugs and sites, and must not pass one.
type localMaximumRecord struct {
	// With adrenaline in the same solution. Example: false
	WithAdrenaline bool `toml:"with_adrenaline"`
	// From this age; blank: birth. Example: "18 years"
	AgeFrom string `toml:"age_from"`
	// Up to this age, which is not included. Example: "12 years"
	AgeTo string `toml:"age_to"`
	// Weight that the figure per kg goes by. Example: "lean"
	By string `toml:"by"`
	// Key of the source that says so. Example: "OB15"
	BySource string `toml:"by_source"`
	// Maximum by weight. Example: { value = "3 mg/kg", source = "LID-UK1" }
	PerKg *figureRecord `toml:"per_kg"`
	// Maximum whatever the weight. Example: { value = "200 mg", source = "LID-UK1" }
	Total *figureRecord `toml:"total"`
	// Maximum in 24 hours. Example: { value = "400 mg", source = "BUP-HID" }
	DayMax *figureRecord `toml:"day_max"`
}

// standardRecord is a concentration that a published list has settled.
type standardRecord struct {
	// Amount in volume; what an order names. Example: "4 mg in 50 mL"
	ID string `toml:"id"`
	// Amount and final volume. Example: "4 mg in 50 mL"
	Mix string `toml:"mix"`
	// Diluent; blank: neat. Example: "glucose 5 %"
	Diluent string `toml:"diluent"`
	// any, peripheral or central. Example: "central"
	Line string `toml:"line"`
	// Whom the list is for: adults, children, newborns. Example: "adults"
	Patients string `toml:"patients"`
	// Whose list it is; a site picks one. Example: "UK"
	Jurisdiction string `toml:"jurisdiction"`
	// Key of the source. Example: "ICS16"
	Source string `toml:"source"`
	// Nobody has verified it. Example: true
	Unverified bool `toml:"unverified"`
}

// stabilityRecord is how long a preparation may be kept.
type stabilityRecord struct {
	// A diluent's name, "neat" or "any". Example: "glucose 5 %"
	Diluent string `toml:"diluent"`
	// room or refrigerator. Example: "room"
	Storage string `toml:"storage"`
	// syringe, bag, glass; blank: any. Example: "syringe"
	Container string `toml:"container"`
	// Lowest concentration that it was shown for. Example: { value = "1 mg/mL", source = "KET2" }
	Low *figureRecord `toml:"low"`
	// Highest concentration that it was shown for. Example: { value = "1 mg/mL", source = "KET2" }
	High *figureRecord `toml:"high"`
	// Time. Example: "24 h"
	Hours string `toml:"hours"`
	// Key of the source. Example: "KET2"
	Source string `toml:"source"`
	// Nobody has verified it. Example: true
	Unverified bool `toml:"unverified"`
}

// mixRecord is two drugs that may share one syringe.
type mixRecord struct {
	// The two drugs, the one that leads first. Example: ["propofol", "lidocaine"]
	Drugs []string `toml:"drugs"`
	// bolus or infusion. Example: "bolus"
	Use string `toml:"use"`
	// Routes. Example: ["IV"]
	Routes []string `toml:"routes"`
	// At most this of the second for this of the first. Example: { value = "20 mg per 200 mg", source = "PRO2" }
	Most *figureRecord `toml:"most"`
	// Concentrations that each drug may have in the mixture. Example: [{ drug = "lidocaine", high = { value = "1 mg/mL", source = "PRO2" } }]
	Bounds []mixBoundRecord `toml:"bound"`
	// Fluids that may be added besides; blank: none. Example: [{ name = "sodium chloride 0.9 %", source = "X" }]
	Diluents []diluentRecord `toml:"diluent"`
	// How long the mixture may be kept. Example: { value = "6 h", source = "PRO7" }
	Life *figureRecord `toml:"life"`
	// Sentences about the mixture. Example: [{ text = "Mix just before use.", source = "PRO2" }]
	Notes []textRecord `toml:"note"`
	// Key of the source that allows the pair. Example: "PRO2"
	Source string `toml:"source"`
	// Nobody has verified it. Example: true
	Unverified bool `toml:"unverified"`
}

// mixBoundRecord bounds one drug in a mixture.
type mixBoundRecord struct {
	// The drug. Example: "lidocaine"
	Drug string `toml:"drug"`
	// Lowest concentration. Example: { value = "0.5 mg/mL", source = "PRO7" }
	Low *figureRecord `toml:"low"`
	// Highest concentration. Example: { value = "1 mg/mL", source = "PRO2" }
	High *figureRecord `toml:"high"`
}

// neverMixRecord is two drugs that must never share one syringe.
type neverMixRecord struct {
	// The two drugs. Example: ["propofol", "remifentanil"]
	Drugs []string `toml:"drugs"`
	// Why, as printed. Example: "remifentanil degrades"
	Reason string `toml:"reason"`
	// Key of the source. Example: "REM3"
	Source string `toml:"source"`
	// Nobody has verified it. Example: true
	Unverified bool `toml:"unverified"`
}

// tallManRecord is one list of names with confusable letters in capitals.
type tallManRecord struct {
	// Whose list it is; a site picks one. Example: "US"
	Jurisdiction string `toml:"jurisdiction"`
	// The names as written by the list. Example: ["DOBUTamine", "DOPamine"]
	Names []string `toml:"names"`
	// Key of the source. Example: "FDA-TM"
	Source string `toml:"source"`
}

// takenAwayRecord says why a limit of the base is gone in a site's file.
type takenAwayRecord struct {
	// The limit, as drawup formulary compare prints it. Example: "dose induction IV: hard_high"
	Limit string `toml:"limit"`
	// Why. Example: "row replaced by age bands"
	Reason string `toml:"reason"`
	// Key of the source. Example: "SITE-1"
	Source string `toml:"source"`
}
