// Package recheck is the second route (rules R17 and "no ink without a second
// route"): it works every printed figure again, backwards, from the printed
// words alone, in whole numbers, with its own unit table and its own rounding
// rule. It imports the standard library only. It can only block.
package recheck

// A Figure is one figure as it will be printed.
//
// Paper says where it stands ("label", "draw-up", "pump card", "check sheet");
// it is used in messages only. Name says what the figure claims to be: one of
// the names below, for rows of a table with the row number in the middle
// ("ladder.3.rate"). Text is the text as printed, for instance "7.2 mL".
type Figure struct {
	Paper string
	Name  string
	Text  string
}

// A Stated is everything that the papers say about one syringe.
//
// Syringe names it in messages. Asked holds what the order says, as typed, and
// where the order leaves a choice to the site what the site's own file says, as
// typed there. Record is the raw text of the formulary file in which the
// presentation's own words are found again, Drug and Presentation say where in
// it. Figures holds every figure of every paper of this syringe, repeated ones
// included.
//
// OtherDrug, OtherPresentation and OtherRecord say the same of the second drug of
// a syringe that holds two, each from a container of its own; they are empty
// where there is none. PairRecord is the text of the file in which their [[mix]]
// stands, where that is neither of the two: sentences and bounds may repeat its
// figures.
//
// These names have no sum that could confirm them, so each that is printed must
// be in Asked under its own name: method (unless neat), drug.step, dose.step,
// rate.step, drug.barrel, final.barrel, weight.actual, height, age, sex, dose,
// dose.count, start.dose, low.dose, high.dose, limit.dose, priming, dead.space,
// wanted.time, other.drug.
//
// Every step but rate.step and every barrel may be asked several times: that is
// the stock to choose from, the first drug.step belonging to the first drug.barrel
// and so on. Steps
// and barrels of an intermediate or a second drug that were not asked under their
// own names (both or neither) are chosen from those of drug.step and drug.barrel.
// A wrong choice from a stock shows only where a sum depends on it, so one entry
// each binds best.
//
// The weight that a dose goes by stands behind the typed dose ("0.3 mg/kg lean")
// or in Asked under dose.weight.by and rate.weight.by; where it is nowhere, only
// "actual" passes. How much drug to draw must follow from an asked amount or
// concentration, rule.rate, drug.volume, container.count, dose.count with a
// final.volume, a final.volume drawn neat, or doses alone; how much of a second
// drug from an asked other.amount, second.amount, second.concentration,
// other.volume or other.container.count. ladder.N.dose is compared where it was
// asked. prepared, prepared.offset, use.hours and use.by.offset are confirmed by
// use.by or else must be asked; atc by the drug's line atc in the record, by
// code.1 or by Asked; serial by code.1 or by Asked.
type Stated struct {
	Syringe           string
	Drug              string
	Presentation      string
	Record            []byte
	OtherDrug         string
	OtherPresentation string
	OtherRecord       []byte
	PairRecord        []byte
	Asked             []Figure
	Figures           []Figure
}

// Names of figures. Each says what it is, and the sum that it must satisfy.
const (
	// The container as supplied.
	ContainerAmount = "container.amount" // drug in one container, "20 mg"
	ContainerVolume = "container.volume" // volume of one container; for a powder the volume after mixing
	ContainerCount  = "container.count"  // whole containers opened, "2"
	Strength        = "strength"         // container.amount / container.volume
	PowderAdded     = "powder.added"     // fluid added to one container of powder
	PowderDisplaced = "powder.displaced" // volume that the powder itself takes; container.volume = added + displaced

	// The mixture.
	Method             = "method"               // "neat", "make up to", "add to", "withdraw, then add"
	DrugVolume         = "drug.volume"          // total drawn from the containers
	DrugStep           = "drug.step"            // graduation of the barrel that measures it; drug.volume is a multiple
	DiluentVolume      = "diluent.volume"       // diluent added ("add to": volume already in the bag; "withdraw, then add": volume left in the bag)
	FinalVolume        = "final.volume"         // drug.volume + diluent.volume (+ other.volume)
	AmountInSyringe    = "amount"               // drug.volume x strength
	Concentration      = "concentration"        // amount / final.volume
	LeftVolume         = "left.volume"          // count x container.volume - drug.volume
	LeftAmount         = "left.amount"          // left.volume x strength
	SecondContainer    = "second.container"     // a second drug in the same container, "500 micrograms"
	SecondAmount       = "second.amount"        // amount x second.container / container.amount; of two drugs, other.amount
	SecondConcentrated = "second.concentration" // second.amount / final.volume
	SubstanceFactor    = "substance.factor"     // the drug's own factor, "4 mmol/g"
	SubstanceAmount    = "substance.amount"     // amount x factor
	SubstanceConc      = "substance.concentration"

	// How sure the concentration is.
	Assay           = "assay"            // half width of the presentation's assay limits, "10 %"
	DrugBarrel      = "drug.barrel"      // nominal capacity of the barrel that measures drug.volume
	FinalBarrel     = "final.barrel"     // nominal capacity of the barrel in which final.volume is read
	IntervalPercent = "interval.percent" // half width of the interval, to 0.1 %
	IntervalLow     = "interval.low"     // concentration x (1 - interval.percent)
	IntervalHigh    = "interval.high"    // concentration x (1 + interval.percent)

	// The patient.
	WeightActual   = "weight.actual"
	Height         = "height"
	Age            = "age"
	Sex            = "sex"
	WeightIdeal    = "weight.ideal"    // Devine 1974
	WeightAdjusted = "weight.adjusted" // ideal + 0.4 (actual - ideal)
	WeightLean     = "weight.lean"     // Janmahasatian 2005
	WeightJames    = "weight.james"    // James 1976
	SurfaceArea    = "surface"         // Mosteller 1987
	BMI            = "bmi"

	// One dose.
	Dose          = "dose"           // as ordered, "0.3 mg/kg" or "2 mg"
	DoseWeightBy  = "dose.weight.by" // "actual", "ideal", "adjusted", "lean", "surface" or "none"
	DoseWeight    = "dose.weight"    // the body weight or surface area that the dose goes by
	DoseAmount    = "dose.amount"    // dose x dose.weight
	DoseVolume    = "dose.volume"    // dose.amount / concentration, on the giving barrel's graduation
	DoseStep      = "dose.step"      // that graduation
	DoseDelivered = "dose.delivered" // dose.volume x concentration
	DoseCount     = "dose.count"     // doses that the syringe holds, as typed, "4"; neat final.volume = dose.count x dose.volume, else it is at least that

	// An infusion.
	RateWeightBy   = "rate.weight.by"
	RateWeight     = "rate.weight"
	RateStep       = "rate.step"       // the pump's step, "0.1 mL/h"
	StartDose      = "start.dose"      // start dose rate
	StartRate      = "start.rate"      // its pump rate, half up to the step
	StartDelivered = "start.delivered" // dose rate that the rounded pump rate gives
	LowDose        = "low.dose"        // lowest dose rate of the range
	LowRate        = "low.rate"        // its rate, rounded up to the step
	HighDose       = "high.dose"       // highest dose rate of the range
	HighRate       = "high.rate"       // its rate, rounded down to the step
	LimitDose      = "limit.dose"      // hard limit of the formulary
	LimitRate      = "limit.rate"      // its rate, rounded down to the step
	RunTime        = "run.time"        // final.volume / start.rate, whole minutes, rounded down, "9 h 25 min"
	EmptyAt        = "empty.at"        // prepared + usable.time; where that is not printed, + run.time
	EmptyOffset    = "empty.offset"    // offset of empty.at; where it is not printed, that of prepared
	Priming        = "priming"         // what fills the line, as typed, "2 mL"
	DeadSpace      = "dead.space"      // what stays in syringe and line, as typed, "0.1 mL"
	UsableTime     = "usable.time"     // (final.volume - priming - dead.space) / start.rate, written and rounded like run.time
	WantedTime     = "wanted.time"     // how long the infusion is to last, as typed, "12 h"; usable.time is not less
	RuleRate       = "rule.rate"       // dose rate that 1 mL/h gives, as typed; where it is not, "1 microgram/kg/min" (rules of six and of three).
	// The amount wanted is rule.rate x rate.weight x final.volume over 1 mL/h.

	// Time.
	Prepared       = "prepared"        // date and time, as the number style writes it
	PreparedOffset = "prepared.offset" // "+01:00"
	UseHours       = "use.hours"       // "24 h", "30 min", "1 h 30 min"
	UseBy          = "use.by"          // prepared + use.hours, absolute hours (R18)
	UseByOffset    = "use.by.offset"

	// What the barcode must repeat.
	ATC    = "atc"    // "N01AX07"
	Serial = "serial" // eight digits
	Ref    = "ref"    // short name of the run, as asked

	// Stock is the name of the blank labels, as typed; where it is printed, or a
	// sentence repeats it, it must be in Asked.
	Stock = "stock"
)

// How a dose or the start rate was rounded, in Asked only: "down" when the
// nearest graduation or pump step would have passed a limit, so that the one
// below was taken; half up otherwise. No figure has these names.
const (
	DoseRounding = "dose.rounding"
	RateRounding = "rate.rounding"
)

// Values before they were rounded, and what the rounding lost (rule R2).
const (
	DrugWanted = "drug.wanted" // volume that the order takes exactly, by RULE SHORT: asked amount, or concentration x final volume, or dose.amount, over the strength
	DrugMoved  = "drug.moved"  // (drug.volume - wanted) / wanted: "1.12 % more", "0.7 % less", "nothing"; the number by RULE SHORT
	DoseWanted = "dose.wanted" // dose.amount (exact) / concentration (exact), by RULE SHORT
	DoseMoved  = "dose.moved"  // (dose.volume - wanted) / wanted, written like drug.moved
	StartFlow  = "start.flow"  // exact flow of start.dose; exactly when two decimals are enough, else by RULE SHORT
	StartMoved = "start.moved" // (start.rate - flow) / flow, written like drug.moved

	IdealFull    = "weight.ideal.full"    // before rounding to 0.1 kg: half up to four decimals, trailing zeros dropped
	AdjustedFull = "weight.adjusted.full" // likewise
	LeanFull     = "weight.lean.full"     // likewise
)

// Names of sentences that hold figures: Row(Said, 3, "text") is one sentence,
// Row(Bound, 3, "text") one limit of the formulary, both as printed.
//
// A sentence that stands word for word (blanks folded) as a text of the drug's
// block in the record is right. In any other, every number with its unit must
// be a value that another figure of this syringe (other sentences, code and slip
// rates apart), a text of Asked, or a text of the drug's block holds, in
// whatever spelling; the reading tolerance of drug.volume in drug.barrel passes
// as well, by the rule of volumes. A number without a unit must stand there
// without a unit, or behind "syringe" in Syringe. A date or time must be one of
// theirs. A word that holds digits must stand there as it is. A bound is held
// against the drug's block alone. Words, and which of the known values a
// sentence takes, are not judged; a sentence without any number passes, an empty
// one does not.
//
// Where Asked holds a row of that name too, it is the text that the paper was
// given to say, and the printed one must be equal to it.
//
// Asked may hold any number of texts under Typed: other words of the order (who
// accepted a limit and why, batch, expiry, the site's settings). Sentences may
// repeat their numbers; no figure has this name.
const (
	Said  = "said"
	Bound = "bound"
	Typed = "typed"
)

// A dilution in two steps: drug is drawn, made up in an intermediate syringe, a
// part of that is taken and made up in the giving syringe. Then drug.volume, where
// it is printed, is intermediate.drug.volume, and so it is where containers are
// counted (container.count, left.volume); method is "make up to"; amount =
// intermediate.taken.volume x intermediate.concentration; final.volume = taken +
// diluent.volume. The taken volume is on one of the two graduations beside what
// the order wants of the intermediate.
//
// interval.percent then has five readings (GUM): assay, drug and taken volume,
// intermediate and final volume. Readings in barrels of one capacity count as
// those of one syringe, whose errors are correlated: two volumes that both raise
// the concentration (drug, taken) or both lower it (intermediate, final) are then
// added before they are squared. Readings of one syringe on opposite sides would
// cancel in part; that is not counted upon.
const (
	IntermediateDrugVolume  = "intermediate.drug.volume"    // drawn of the containers, a multiple of its step, less than intermediate.volume
	IntermediateDrugStep    = "intermediate.drug.step"      // graduation of that barrel
	IntermediateDrugBarrel  = "intermediate.drug.barrel"    // its nominal capacity
	IntermediateVolume      = "intermediate.volume"         // made up to, a multiple of its step
	IntermediateStep        = "intermediate.step"           // graduation of the intermediate syringe
	IntermediateBarrel      = "intermediate.barrel"         // its nominal capacity
	IntermediateDiluent     = "intermediate.diluent.volume" // intermediate.volume - intermediate.drug.volume
	IntermediateAmount      = "intermediate.amount"         // intermediate.drug.volume x strength
	IntermediateConc        = "intermediate.concentration"  // intermediate.amount / intermediate.volume
	IntermediateUseHours    = "intermediate.use.hours"      // the intermediate's own label
	IntermediateUseBy       = "intermediate.use.by"         // prepared + intermediate.use.hours
	IntermediateUseByOffset = "intermediate.use.by.offset"
	TakenVolume             = "intermediate.taken.volume" // taken of the intermediate, a multiple of its step
	TakenStep               = "intermediate.taken.step"   // graduation of the barrel that measures it
	TakenBarrel             = "intermediate.taken.barrel" // its nominal capacity
	IntermediateLeftVolume  = "intermediate.left.volume"  // intermediate.volume - intermediate.taken.volume, thrown away
	IntermediateLeftAmount  = "intermediate.left.amount"  // intermediate.left.volume x intermediate.concentration
	TargetMoved             = "target.moved"              // (concentration - wanted) / wanted, written like drug.moved; wanted is the asked concentration, or the amount asked over final.volume
)

// Two drugs in one syringe, each from its own container. Figures of the second
// container come from the second drug's record.
const (
	OtherDrug            = "other.drug"             // the second drug's name, as its record files it
	OtherContainerAmount = "other.container.amount" // like container.amount
	OtherContainerVolume = "other.container.volume" // like container.volume
	OtherContainerCount  = "other.container.count"  // like container.count
	OtherStrength        = "other.strength"         // other.container.amount / other.container.volume
	OtherVolume          = "other.volume"           // drawn of the second drug, a multiple of other.step
	OtherStep            = "other.step"             // graduation of the barrel that measures it
	OtherBarrel          = "other.barrel"           // its nominal capacity
	OtherAmount          = "other.amount"           // other.volume x other.strength
	OtherLeftVolume      = "other.left.volume"      // count x container volume - other.volume
	OtherLeftAmount      = "other.left.amount"      // other.left.volume x other.strength
)

// Names of table rows: Row("ladder", 3, "rate") is "ladder.3.rate".
//
//	ladder.N.dose       a dose rate
//	ladder.N.rate       its pump rate, half up to the step
//	ladder.N.delivered  the dose rate that this pump rate gives
//	slip.N.kind         "per minute for per hour", "per hour for per minute", "ten times", "a tenth", "pounds for kilograms"
//	slip.N.rate         the pump rate that this slip would show, half up to the step, from the exact start dose
//	code.N.text         a form of the barcode in human-readable form, the fullest first; every part is held against what it repeats
//	pack.N.presentation a size of container that is opened, by its id in the record; pack.1 is that of container.amount
//	pack.N.amount       drug in one of them, as the record says
//	pack.N.volume       volume of one of them, as the record says; amount / volume = strength
//	pack.N.count        how many of them are opened; container.count is the sum, and one less of any size would not do
//
// Where sizes are printed, left.volume is the sum of count x volume less
// drug.volume.
const (
	Ladder = "ladder"
	Slip   = "slip"
	Code   = "code"
	Pack   = "pack"
)

// What stands behind the barcode, in Asked only; no figure has these names. The
// number is the site's own for this preparation, with the drug, concentration
// and volume that it stands for.
const (
	FormularyDigest      = "formulary.digest"
	ProductNumber        = "product.number"
	ProductDrug          = "product.drug"
	ProductConcentration = "product.concentration"
	ProductVolume        = "product.volume"
)
