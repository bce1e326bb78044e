package certainty

import (
	"math/big"

	"drawup/dilution/quantity"
	"drawup/dilution/syringe"
)

// A Measured is one reading: a volume on the graduation of a syringe.
type Measured struct {
	Volume quantity.Volume
	Barrel syringe.Barrel

	// Syringe names the piece in the hand. Readings of one name are of one
	// syringe and share its fault; "" is a syringe of its own.
	Syringe string
}

// Limits are the assay limits of a presentation, in per cent of the printed
// strength: 90 % and 110 %. The zero value is no limits and is refused.
type Limits struct {
	Low, High quantity.Percent
}

// Around gives the limits p either way of the printed strength. With 0 % the
// interval is that of the measuring alone.
func Around(p quantity.Percent) Limits {
	if !p.Given() {
		return Limits{}
	}
	hundred := big.NewRat(100, 1)
	return Limits{
		quantity.PerCent(new(big.Rat).Sub(hundred, p.Rat())),
		quantity.PerCent(new(big.Rat).Add(hundred, p.Rat())),
	}
}

// A Fill is a volume that nobody reads on a syringe: what a bag holds, or what
// a powder takes up.
type Fill struct {
	// Stated is the volume that the concentration is worked with: the nominal
	// volume of a bag, the displacement of a powder (0 mL if negligible).
	Stated quantity.Volume

	// Least and Most are the limits of the true volume: of a bag with known
	// overfill above Stated, of a bag that was measured both the measured volume.
	// Neither given: not known, and [Result.NotCovered] says so.
	Least, Most quantity.Volume
}

// A Powder is how a powder was mixed.
type Powder struct {
	Added     Measured // the fluid
	Displaced Fill     // the powder's own volume
}

// A Preparation is everything that a concentration is worked from.
type Preparation struct {
	// Strength is the printed one; of a powder, after mixing.
	Strength quantity.Concentration
	Assay    Limits
	Powder   *Powder // nil if nothing has to be mixed
	Steps    []Step  // none: neat; each draws from what the one before makes
}

// A Step is one dilution. [MakeUpTo], [AddDiluent], [AddToBag] and
// [WithdrawThenAdd] make one; the zero value is no step and is refused.
type Step struct {
	way           way
	drawn, others []Measured
	bag           Fill
	removed       []Measured
}

// way tells the sums of rule R5 apart. The zero value is none.
type way int

const (
	makeUpTo way = iota + 1
	addDiluent
	addToBag
	withdrawThenAdd
)

// MakeUpTo is drug drawn, then diluent up to final, read on its own: drawn /
// final.
func MakeUpTo(final Measured, drawn ...Measured) Step {
	return Step{way: makeUpTo, drawn: drawn, others: []Measured{final}}
}

// AddDiluent is drug drawn and diluent measured and added: drawn / (drawn +
// added).
func AddDiluent(added []Measured, drawn ...Measured) Step {
	return Step{way: addDiluent, drawn: drawn, others: added}
}

// AddToBag is drug drawn and added to a full bag: drawn / (bag + drawn).
func AddToBag(bag Fill, drawn ...Measured) Step {
	return Step{way: addToBag, drawn: drawn, bag: bag}
}

// WithdrawThenAdd is fluid withdrawn from a bag, then drug drawn and added:
// drawn / (bag - removed + drawn).
func WithdrawThenAdd(bag Fill, removed []Measured, drawn ...Measured) Step {
	return Step{way: withdrawThenAdd, drawn: drawn, bag: bag, removed: removed}
}
