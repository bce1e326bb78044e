package twostep

import (
	"math/big"

	"drawup/dilution/quantity"
	"drawup/dilution/syringe"
)

// A Wanted is what the giving syringe shall hold, and what there is to make it
// with.
type Wanted struct {
	Strength quantity.Concentration // of what is drawn from: the presentation, as mixed

	// The target: a final volume, and either the concentration in it or the
	// amount. Both may be given if they agree.
	Volume        quantity.Volume
	Concentration quantity.Concentration
	Amount        quantity.Amount

	Barrels []syringe.Barrel // stocked; zero ones are passed over
	Giving  []syringe.Barrel // those that the final volume may be made up in; empty: any of Barrels

	Smallest  quantity.Volume  // the site's smallest measurable volume (rule R8)
	Tolerance quantity.Percent // how far the concentration may be off the target, either way

	// Bounds of the intermediate concentration, as the formulary allows them. One
	// that is not given binds nothing here; the planner answers for rule R10.
	Low, High quantity.Concentration
}

// need is the volume of the strength that the target takes, and the
// concentration that it is held against.
func (w Wanted) need() (quantity.Volume, quantity.Concentration, error) {
	var none quantity.Volume
	amount := w.Amount
	if w.Concentration.Given() {
		held, err := w.Volume.Holds(w.Concentration)
		if err != nil {
			return none, w.Concentration, err
		}
		if amount.Given() {
			if n, err := held.Cmp(amount); err != nil {
				return none, w.Concentration, err
			} else if n != 0 {
				return none, w.Concentration, &DisagreeError{Amount: amount, Volume: w.Volume, Concentration: w.Concentration}
			}
		}
		amount = held
	}
	target, err := amount.In(w.Volume)
	if err != nil {
		return none, target, err
	}
	need, err := amount.DrawnAt(w.Strength)
	if err != nil {
		return none, target, err
	}
	if need.Cmp(w.Volume) >= 0 {
		return none, target, &NotWeakerError{Strength: w.Strength, Target: target}
	}
	return need, target, nil
}

// check refuses what is missing or contradicts itself, before any sum.
func (w Wanted) check() error {
	switch {
	case !w.Strength.Given():
		return missing("the strength")
	case !w.Volume.Given():
		return missing("the final volume")
	case !w.Concentration.Given() && !w.Amount.Given():
		return missing("a concentration or an amount")
	case !w.Smallest.Given():
		return missing("the smallest measurable volume")
	case !w.Tolerance.Given() || w.Tolerance.Rat().Sign() < 0 || w.Tolerance.Rat().Cmp(big.NewRat(100, 1)) > 0:
		return missing("how far the concentration may be off, 0 % to 100 %,")
	}
	for _, bound := range []quantity.Concentration{w.Low, w.High} {
		if bound.Given() && bound.Kind() != w.Strength.Kind() {
			return &quantity.KindError{Got: bound.Kind(), Want: w.Strength.Kind()}
		}
	}
	if w.Low.Given() && w.High.Given() && w.Low.Rat().Cmp(w.High.Rat()) > 0 {
		return &BoundsError{Low: w.Low, High: w.High}
	}
	return nil
}

// ofStrength is a bound as a share of the strength, nil if it is not given.
func (w Wanted) ofStrength(bound quantity.Concentration) *big.Rat {
	if !bound.Given() {
		return nil
	}
	return new(big.Rat).Quo(bound.Rat(), w.Strength.Rat())
}

// give reads the final volume in the giving syringe: of those that hold it and
// have a line at it, the one that reads it most surely, then the smallest.
func (w Wanted) give() (syringe.Reading, error) {
	list := w.Giving
	if len(list) == 0 {
		list = w.Barrels
	}
	var best syringe.Barrel
	refused := &UnreadableError{Volume: w.Volume}
	for _, b := range list {
		if !b.Given() || b.Nominal().Cmp(w.Volume) < 0 {
			continue
		}
		near, _, err := w.Volume.ToStep(b.Step(), quantity.HalfUp)
		if err != nil {
			return syringe.Reading{}, err
		}
		if near.Cmp(w.Volume) != 0 {
			refused.nearer(near)
			continue
		}
		if !best.Given() || surer(b, best, w.Volume) {
			best = b
		}
	}
	if !best.Given() {
		return syringe.Reading{}, refused
	}
	if t := best.Tolerance(w.Volume).Rat(); t.Cmp(new(big.Rat).Mul(w.Volume.Rat(), widest())) > 0 {
		return syringe.Reading{}, refused
	}
	return best.Read(w.Volume, w.Smallest, w.Tolerance)
}

// surer reports whether b reads v more surely than c: a smaller tolerance, then
// a smaller capacity, then finer lines.
func surer(b, c syringe.Barrel, v quantity.Volume) bool {
	for _, pair := range [][2]quantity.Volume{
		{b.Tolerance(v), c.Tolerance(v)}, {b.Nominal(), c.Nominal()}, {b.Step(), c.Step()},
	} {
		if n := pair[0].Cmp(pair[1]); n != 0 {
			return n < 0
		}
	}
	return false
}

// widest is the largest tolerance, as a share of the volume, of a reading that
// is weighed at all: our own choice, one that may be off by more than nine
// tenths of itself measures nothing.
func widest() *big.Rat { return big.NewRat(9, 10) }
