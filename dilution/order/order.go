package order

import (
	"time"

	"drawup/dilution/body"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// A Field is one value with the text it was read from and its place. A value
// that is not in the file has no text; one that could not be read has its text,
// a zero Value, and a reason in the list of [Read].
type Field[T any] struct {
	Value T
	Text  string      // as written; "" if not given
	Pos   refusal.Pos // of the value, or of the nearest table when not given
}

// Given reports whether the file holds a text for the field.
func (f Field[T]) Given() bool { return f.Text != "" }

// An Order is one order file.
type Order struct {
	File     string
	Session  Session
	Site     Site
	Patients []Patient
	// Syringes holds all syringes in making order: patient by patient as they
	// stand in the file, first the patient's syringes, then the infusions.
	Syringes []Syringe
}

// A Session is when, where and by whom the syringes are made.
type Session struct {
	Place    Field[string]
	Prepared Field[time.Time] // Date and Clock in Zone
	Date     Field[string]    // "2026-12-01"
	Clock    Field[string]    // "07:30"
	Zone     Field[string]    // IANA name or "+01:00"; UTC when not given
	Preparer Field[string]
	Invented bool // demonstration data, said on every sheet
}

// A Site is the house's settings. What is not given has the caller's default.
type Site struct {
	Style          Field[quantity.Style]
	BolusUseBy     Field[time.Duration]    // from 1 min to 30 days, our own bound
	InfusionUseBy  Field[time.Duration]    // as BolusUseBy
	Smallest       Field[quantity.Volume]  // smallest volume that may be measured (R8)
	Tolerance      Field[quantity.Percent] // how far a graduation may move a volume (R8)
	PumpStep       Field[quantity.FlowRate]
	Barrels        []Field[quantity.Volume] // syringe sizes in stock
	Jurisdiction   Field[string]            // whose standard preparations are used; any when not given
	TallMan        Field[string]            // whose tall-man list names are printed by; none when not given
	DualNames      bool                     // the other name follows in brackets
	Edition        Field[string]            // of ISO 26825, Edition2008 or Edition2020; the latter when not given
	Anticoagulants Field[string]            // Teal or White; White when not given
	Products       []Product                // preparations with a GTIN of the site's own
}

// A Product is a preparation to which the site has given a trade item number
// (GTIN) out of its own GS1 company prefix: one drug at one concentration in one
// volume.
type Product struct {
	Number        Field[string] // 14 digits, the last of which checks the others
	Drug          Field[string]
	Concentration Field[quantity.Concentration]
	Volume        Field[quantity.Volume]
	Pos           refusal.Pos
}

// Editions of the standard for syringe labels, and the two ways to colour
// anticoagulants: teal by a regional custom, or white as everything else.
const (
	Edition2008 = "2008"
	Edition2020 = "2020"
	Teal        = "teal"
	White       = "white"
)

// A Patient is whom the syringes are for.
type Patient struct {
	ID, Name  Field[string]
	Sex       Field[body.Sex]
	Age       Field[body.Age]
	Height    Field[quantity.Length]
	Weight    Field[quantity.BodyWeight]
	Weighed   Field[string] // when or how, in the user's words
	Estimated bool          // the weight is an estimate
	Frail     bool          // rows of limits for the frail go before the others
	Pos       refusal.Pos
}

// A Syringe is one syringe that is wanted, given at once or by a pump.
type Syringe struct {
	Number   int // in making order, from 1
	Patient  int // index in Order.Patients
	Infusion bool
	Pos      refusal.Pos

	Drug, Presentation, Indication Field[string]
	Diluent, Route, Line, Batch    Field[string]
	// Expiry is the last minute of the day, or of the month, that the
	// presentation's pack states, in the session's zone.
	Expiry Field[time.Time]
	Size   Field[quantity.Volume] // nominal volume of the giving syringe

	// Of a syringe: one of dose; amount; amount and volume; concentration and
	// volume; a dose with either of these pairs; a number of doses, alone or with a
	// concentration or a volume.
	Dose          Field[quantity.Dose]
	DoseBy        Field[body.Kind] // the word after the dose: "0.3 mg/kg lean"
	Amount        Field[quantity.Amount]
	Concentration Field[quantity.Concentration]
	Volume        Field[quantity.Volume]
	Doses         Field[int]  // how many doses it is to hold
	Dilute        Field[bool] // it may be diluted where the neat dose cannot be measured

	// Of an infusion: a standard preparation by name; a mixture; a concentration
	// with a volume or for so many hours; a mixture made for one weight; or hours
	// alone, for the planner to choose a standard preparation that lasts them.
	Standard        Field[string]
	MixAmount       Field[quantity.Amount]
	MixVolume       Field[quantity.Volume]
	Method          Field[string] // one of the Method texts; MakeUpTo when not given
	Start, From, To Field[quantity.DoseRate]
	RateBy          Field[body.Kind] // the word after the start dose rate

	// How long it is to last at the start rate, and what of its volume never
	// reaches the patient: what fills the line, what stays in syringe and line.
	Hours              Field[time.Duration]
	Priming, DeadSpace Field[quantity.Volume]

	// A mixture made for one weight: its rule, and the dose rate that 1 mL/h of it
	// gives (1 microgram/kg/min when not given).
	Mixture Field[string]
	Each    Field[quantity.DoseRate]

	// A named person and a reason take the responsibility for a soft limit (R11).
	AcceptedBy, AcceptedReason Field[string]
}

// Methods of mixing: three different sums (rule R5).
const (
	MakeUpTo        = "make up to"
	AddTo           = "add to"
	WithdrawThenAdd = "withdraw, then add"
)

// Rules of mixtures that are made for one weight.
const (
	RuleOfSix   = "rule of six"   // 6 mg for each kg in 100 mL: 1 mL/h gives 1 microgram/kg/min
	RuleOfThree = "rule of three" // 3 mg for each kg in 50 mL: the same
)
