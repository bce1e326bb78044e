// Package salts holds molar masses of named salts, hydrates and ions, and turns
// mass into amount of substance, milliequivalents into either, and a salt's
// mass into its base's (calculation reference a4, a5).
//
// It never guesses the hydrate: calcium chloride without its water has no
// entry, because the dihydrate and the hexahydrate differ by half.
package salts

import (
	"fmt"
	"math/big"

	"drawup/dilution/quantity"
)

// AtomicWeights is the source of every molar mass: sums of these weights.
const AtomicWeights = "IUPAC standard atomic weights 2021, abridged; Prohaska et al., Pure Appl Chem 2022, doi:10.1515/pac-2019-0603"

// An Ion is one sort of ion in a salt.
type Ion struct {
	Name   string // "chloride"
	Count  int64  // how many of it are in one formula unit
	Charge int64  // elementary charges on each, without the sign
}

// A Salt is one substance as a label names it, water included.
type Salt struct {
	name, formula string
	molar         int64 // 0.00001 g/mol
	ions          []Ion
	counted       Ion // the ion that mmol count, or the zero Ion for formula units
	base          string
	baseFormula   string
	baseMolar     int64 // 0.00001 g/mol
	baseCount     int64 // molecules of base in one formula unit
	checked       string
}

// Find is the salt or ion of that name, for instance "magnesium sulfate
// heptahydrate" or "sodium".
func Find(name string) (Salt, bool) {
	for _, s := range table() {
		if s.name == name {
			return s, true
		}
	}
	return Salt{}, false
}

// Names lists all salts and ions.
func Names() []string {
	var out []string
	for _, s := range table() {
		out = append(out, s.name)
	}
	return out
}

// Name is the salt's name, water included.
func (s Salt) Name() string { return s.name }

// Formula is the chemical formula, its parts separated by points.
func (s Salt) Formula() string { return s.formula }

// Base is the name of the base that the salt holds, "" when it has none here.
func (s Salt) Base() string { return s.base }

// BaseFormula is the formula of that base.
func (s Salt) BaseFormula() string { return s.baseFormula }

// Ions lists the ions of the salt, the first named first.
func (s Salt) Ions() []Ion { return append([]Ion(nil), s.ions...) }

// Checked names a published figure with which the molar mass was found to
// agree, or is "": then nobody has compared it and a caution is due.
func (s Salt) Checked() string { return s.checked }

// GramsPerMole is the molar mass of the salt.
func (s Salt) GramsPerMole() *big.Rat { return big.NewRat(s.molar, 100000) }

// BaseGramsPerMole is the molar mass of the base, zero when there is none.
func (s Salt) BaseGramsPerMole() *big.Rat { return big.NewRat(s.baseMolar, 100000) }

// Counting is s with mmol counted of one of its ions instead of formula units.
func (s Salt) Counting(ion string) (Salt, error) {
	for _, i := range s.ions {
		if i.Name == ion {
			s.counted = i
			return s, nil
		}
	}
	return Salt{}, &Error{Salt: s.name, Why: fmt.Sprintf("got the ion %q, want one that the salt holds", ion)}
}

// Counted is the name of what mmol count: an ion, or the salt itself.
func (s Salt) Counted() string {
	if s.counted.Name != "" {
		return s.counted.Name
	}
	return s.name
}

// perFormula is how many mmol are counted in one mmol of formula units.
func (s Salt) perFormula() int64 {
	if s.counted.Count > 0 {
		return s.counted.Count
	}
	return 1
}

// Moles is the amount of substance in a mass of the salt.
func (s Salt) Moles(a quantity.Amount) (quantity.Amount, error) {
	if a.Kind() != quantity.ByMass {
		return quantity.Amount{}, &quantity.KindError{Got: a.Kind(), Want: quantity.ByMass}
	}
	return a.Scaled(big.NewRat(100000*s.perFormula(), s.molar), quantity.Millimole()), nil
}

// Mass is the mass of the salt that holds an amount of substance.
func (s Salt) Mass(a quantity.Amount) (quantity.Amount, error) {
	if a.Kind() != quantity.BySubstance {
		return quantity.Amount{}, &quantity.KindError{Got: a.Kind(), Want: quantity.BySubstance}
	}
	return a.Scaled(big.NewRat(s.molar, 100000*s.perFormula()), quantity.Milligram()), nil
}

// OfCharge is the amount of substance that carries mEq milliequivalents: of
// the counted ion, or of formula units by the charge of the first ion.
func (s Salt) OfCharge(mEq *big.Rat) (quantity.Amount, error) {
	charge := s.counted.Charge
	if charge == 0 && len(s.ions) > 0 {
		charge = s.ions[0].Charge * s.ions[0].Count
	}
	if charge == 0 {
		return quantity.Amount{}, &Error{Salt: s.name, Why: "it has no ion, so milliequivalents mean nothing"}
	}
	return quantity.AmountOf(new(big.Rat).Mul(mEq, big.NewRat(1, charge)), quantity.Millimole()), nil
}

// baseShare is the mass of base in one unit of mass of the salt.
func (s Salt) baseShare() (*big.Rat, error) {
	if s.base == "" {
		return nil, &Error{Salt: s.name, Why: "no base is recorded for it"}
	}
	return big.NewRat(s.baseCount*s.baseMolar, s.molar), nil
}

// ToBase is the mass of base in a mass of the salt.
func (s Salt) ToBase(a quantity.Amount) (quantity.Amount, error) { return s.byShare(a, false) }

// ToSalt is the mass of the salt that holds a mass of base.
func (s Salt) ToSalt(a quantity.Amount) (quantity.Amount, error) { return s.byShare(a, true) }

func (s Salt) byShare(a quantity.Amount, inverse bool) (quantity.Amount, error) {
	share, err := s.baseShare()
	if err != nil {
		return quantity.Amount{}, err
	}
	if a.Kind() != quantity.ByMass {
		return quantity.Amount{}, &quantity.KindError{Got: a.Kind(), Want: quantity.ByMass}
	}
	if inverse {
		share.Inv(share)
	}
	return a.Scaled(share, a.Unit()), nil
}

// An Error says what a salt cannot do.
type Error struct{ Salt, Why string }

func (e *Error) Error() string { return e.Salt + ": " + e.Why }
