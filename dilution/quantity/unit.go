package quantity

// A Kind is how a drug is counted. The zero value means "not given".
type Kind int

// Kinds of counting.
const (
	ByMass      Kind = iota + 1 // gram and its parts
	ByActivity                  // units of biological activity, each drug's own
	BySubstance                 // mole and its parts
)

// String is the kind in words, "nothing" for the zero value.
func (k Kind) String() string {
	switch k {
	case ByMass:
		return "mass"
	case ByActivity:
		return "units"
	case BySubstance:
		return "amount of substance"
	}
	return "nothing"
}

// A Basis is what a dose is counted per. The zero value means "not given".
type Basis int

// Bases of a dose or dose rate.
const (
	Absolute       Basis = iota + 1 // for the patient as a whole
	PerKilogram                     // for each kilogram of body weight
	PerSquareMetre                  // for each square metre of body surface
)

// String is the basis in words, "nothing" for the zero value.
func (b Basis) String() string {
	switch b {
	case Absolute:
		return "absolute"
	case PerKilogram:
		return "per kg"
	case PerSquareMetre:
		return "per m²"
	}
	return "nothing"
}

// A Unit is one unit in which an amount of drug is written.
// The zero value means "not given".
type Unit struct {
	word  string // the name in house style "uk": "microgram"
	kind  Kind
	scale exact // in mg, units or mmol
}

// Kind is how the unit counts.
func (u Unit) Kind() Kind { return u.kind }

// String is the unit's plain name, singular.
func (u Unit) String() string { return u.word }

// Gram is the gram, 1000 mg.
func Gram() Unit { return Unit{"g", ByMass, whole(1000)} }

// Milligram is the milligram, the base of what is counted by mass.
func Milligram() Unit { return Unit{"mg", ByMass, whole(1)} }

// Microgram is the microgram, a thousandth of a milligram.
func Microgram() Unit { return Unit{"microgram", ByMass, fraction(1, 1000)} }

// Nanogram is the nanogram, a thousandth of a microgram.
func Nanogram() Unit { return Unit{"nanogram", ByMass, fraction(1, 1000000)} }

// Units is the unit of biological activity, each drug's own.
func Units() Unit { return Unit{"unit", ByActivity, whole(1)} }

// Milliunits is a thousandth of a unit of biological activity.
func Milliunits() Unit { return Unit{"milliunit", ByActivity, fraction(1, 1000)} }

// Millimole is the millimole, the base of what is counted by amount of
// substance.
func Millimole() Unit { return Unit{"mmol", BySubstance, whole(1)} }

// Micromole is the micromole, a thousandth of a millimole.
func Micromole() Unit { return Unit{"micromol", BySubstance, fraction(1, 1000)} }

// unitNamed reads the spelling of a unit of amount.
func unitNamed(s string) (Unit, bool) {
	switch s {
	case "g", "gram", "grams":
		return Gram(), true
	case "mg", "milligram", "milligrams":
		return Milligram(), true
	case "microgram", "micrograms", "mcg", "\u00b5g", "\u03bcg":
		return Microgram(), true
	case "ng", "nanogram", "nanograms":
		return Nanogram(), true
	case "unit", "units":
		return Units(), true
	case "milliunit", "milliunits":
		return Milliunits(), true
	case "mmol", "millimole", "millimoles":
		return Millimole(), true
	case "micromol", "micromols", "micromole", "micromoles", "\u00b5mol", "\u03bcmol":
		return Micromole(), true
	}
	return Unit{}, false
}

// A Period is the unit of time in a rate. The zero value means "not given".
type Period int

// Periods of a rate.
const (
	PerMinute Period = iota + 1 // 60 in an hour
	PerHour                     // the base
	PerDay                      // of 24 hours
)

// perHour is how many of this period make an hour.
func (p Period) perHour() exact {
	switch p {
	case PerMinute:
		return whole(60)
	case PerHour:
		return whole(1)
	case PerDay:
		return fraction(1, 24)
	}
	return exact{}
}

// String is the period as paper writes it: min, h, day; "" for the zero value.
func (p Period) String() string {
	switch p {
	case PerMinute:
		return "min"
	case PerHour:
		return "h"
	case PerDay:
		return "day"
	}
	return ""
}

// periodNamed reads the spelling of a unit of time.
func periodNamed(s string) (Period, bool) {
	switch s {
	case "min", "minute", "mins":
		return PerMinute, true
	case "h", "hr", "hour":
		return PerHour, true
	case "day", "d", "24h":
		return PerDay, true
	}
	return 0, false
}

// volumeScale reads the spelling of a unit of volume: how many mL it holds.
func volumeScale(s string) (exact, bool) {
	switch s {
	case "mL", "ml", "millilitre", "millilitres":
		return whole(1), true
	case "L", "l", "litre", "litres":
		return whole(1000), true
	}
	return exact{}, false
}
