package syringe

import (
	"fmt"
	"math/big"

	"drawup/dilution/quantity"
)

// A Reading is a volume on the graduation of a barrel.
type Reading struct {
	Barrel Barrel
	// Volume is what is read: a multiple of the barrel's graduation.
	Volume quantity.Volume
	// MovedPercent is Volume minus the wanted volume in per cent of the wanted
	// one; 0 if nothing moved (rule R2).
	MovedPercent *big.Rat
	// Tolerance is how far the expelled volume may be off, in mL either way.
	Tolerance quantity.Volume
	// UnderFifth reports a volume under 20 % of the barrel's capacity (rule R8).
	UnderFifth bool
}

// Relative is the tolerance in per cent of the volume, for [Interval]; not
// given for the zero Reading.
func (r Reading) Relative() quantity.Percent {
	if !r.Tolerance.Given() || !positive(r.Volume) {
		return quantity.Percent{}
	}
	x := new(big.Rat).Quo(r.Tolerance.Rat(), r.Volume.Rat())
	return quantity.PerCent(x.Mul(x, big.NewRat(100, 1)))
}

// BelowSmallest says that a volume is smaller than the site measures (rule R8).
// OnGraduation is given where only the move to the graduation went below.
type BelowSmallest struct {
	Got, OnGraduation, Smallest quantity.Volume
}

// Error says what was got and what is wanted.
func (e *BelowSmallest) Error() string {
	if e.OnGraduation.Given() {
		return fmt.Sprintf("got %s mL, which reads %s mL, want at least %s mL", text(e.Got), text(e.OnGraduation), text(e.Smallest))
	}
	return fmt.Sprintf("got %s mL, want at least %s mL", text(e.Got), text(e.Smallest))
}

// NoBarrel says that no barrel holds a volume. Largest is the largest there
// is; not given where there is none at all.
type NoBarrel struct {
	Got, Largest quantity.Volume
}

// Error says what was got and what is wanted.
func (e *NoBarrel) Error() string {
	return fmt.Sprintf("got %s mL, want at most %s mL, the largest barrel", text(e.Got), text(e.Largest))
}

// OffGraduation says that the graduation is too coarse for a volume: moving it
// to the nearest line changes it by more than the site allows (rule R8).
type OffGraduation struct {
	Got, Moved quantity.Volume
	Barrel     Barrel
	Percent    *big.Rat // moved minus wanted, in per cent of wanted
	Within     quantity.Percent
}

// Error says what was got and what is wanted.
func (e *OffGraduation) Error() string {
	return fmt.Sprintf("got %s mL, nearest line %s mL on the %s mL barrel, a change of %s %%, want at most %s %% either way",
		text(e.Got), text(e.Moved), text(e.Barrel.nominal), e.Percent.FloatString(1), e.Within.Exact())
}

// Measure finds the barrel of stock that shows v best and reads v on it, moved
// half up to its graduation (rules R2 and R8). Of the barrels that hold v, the
// one is taken that
//
//  1. v fills to a fifth or more, if there is one;
//  2. moves v least, not at all if one has a line there;
//  3. is smallest;
//  4. is graduated most finely.
//
// Where a larger barrel is never graduated more finely than a smaller one, as
// among the [Known] ones, that is the smallest barrel that holds v.
//
// Smallest is the site's smallest measurable volume; within is how far, in per
// cent of v, the move may go. Errors: *quantity.NotGivenError, *BelowSmallest,
// *NoBarrel, *OffGraduation.
func Measure(v quantity.Volume, stock []Barrel, smallest quantity.Volume, within quantity.Percent) (Reading, error) {
	if err := readable(v, smallest, within); err != nil {
		return Reading{}, err
	}
	if v.Cmp(smallest) < 0 {
		return Reading{}, &BelowSmallest{Got: v, Smallest: smallest}
	}
	var best Look
	var largest quantity.Volume
	for _, b := range stock {
		if !b.Given() {
			continue
		}
		if !largest.Given() || b.nominal.Cmp(largest) > 0 {
			largest = b.nominal
		}
		if best.unbeaten(b) {
			continue
		}
		if look := b.Look(v); look.Holds && (!best.Holds || look.Before(best)) {
			best = look
		}
	}
	if !best.Holds {
		return Reading{}, &NoBarrel{Got: v, Largest: largest}
	}
	return best.Barrel.Read(v, smallest, within)
}

// A Look is how one barrel would show a volume, before any rule allows it.
type Look struct {
	Barrel     Barrel
	Holds      bool            // the volume fits into it
	Line       quantity.Volume // the nearest line, a tie goes up
	Moved      *big.Rat        // how far the line lies from the volume, in mL, never negative
	UnderFifth bool            // the volume fills less than a fifth of it
}

// Look is how the barrel would show v; the zero Look with the barrel for what it
// does not hold.
func (b Barrel) Look(v quantity.Volume) Look {
	if !b.Given() || !v.Given() || b.nominal.Cmp(v) < 0 {
		return Look{Barrel: b}
	}
	line, _, err := v.ToStep(b.step, quantity.HalfUp)
	if err != nil {
		return Look{Barrel: b}
	}
	moved := new(big.Rat).Sub(line.Rat(), v.Rat())
	return Look{Barrel: b, Holds: true, Line: line, Moved: moved.Abs(moved),
		UnderFifth: line.Cmp(share(b.nominal.Rat(), 1, 5)) < 0}
}

// unbeaten reports that b, whatever it shows, cannot go before x: x has a line at
// the volume, which fills a fifth of it, and is smaller or finer.
func (x Look) unbeaten(b Barrel) bool {
	return x.Holds && !x.UnderFifth && x.Moved.Sign() == 0 && x.Barrel.Before(b)
}

// Before reports whether x shows the volume better than y, by the rule of
// [Measure]. Both must hold it.
func (x Look) Before(y Look) bool {
	if x.UnderFifth != y.UnderFifth {
		return !x.UnderFifth
	}
	if n := x.Moved.Cmp(y.Moved); n != 0 {
		return n < 0
	}
	return x.Barrel.Before(y.Barrel)
}

// Before reports whether b is smaller than c, or as large and finer.
func (b Barrel) Before(c Barrel) bool {
	if n := b.nominal.Cmp(c.nominal); n != 0 {
		return n < 0
	}
	return b.step.Cmp(c.step) < 0
}

// Read reads v on this barrel, moved half up to its graduation, for a barrel
// that is already chosen. Arguments and errors are those of [Measure].
func (b Barrel) Read(v, smallest quantity.Volume, within quantity.Percent) (Reading, error) {
	if err := readable(v, smallest, within); err != nil {
		return Reading{}, err
	}
	if v.Cmp(smallest) < 0 {
		return Reading{}, &BelowSmallest{Got: v, Smallest: smallest}
	}
	if !b.Given() || b.nominal.Cmp(v) < 0 {
		return Reading{}, &NoBarrel{Got: v, Largest: b.nominal}
	}
	moved, percent, err := v.ToStep(b.step, quantity.HalfUp)
	if err != nil {
		return Reading{}, err
	}
	if moved.IsZero() || new(big.Rat).Abs(percent).Cmp(within.Rat()) > 0 {
		return Reading{}, &OffGraduation{Got: v, Moved: moved, Barrel: b, Percent: percent, Within: within}
	}
	if moved.Cmp(smallest) < 0 {
		return Reading{}, &BelowSmallest{Got: v, OnGraduation: moved, Smallest: smallest}
	}
	fifth := share(b.nominal.Rat(), 1, 5)
	return Reading{Barrel: b, Volume: moved, MovedPercent: percent, Tolerance: b.Tolerance(moved), UnderFifth: moved.Cmp(fifth) < 0}, nil
}

// readable refuses to measure with a value missing.
func readable(v, smallest quantity.Volume, within quantity.Percent) error {
	switch {
	case !positive(v):
		return &quantity.NotGivenError{What: "a volume above zero to measure"}
	case !smallest.Given():
		return &quantity.NotGivenError{What: "the smallest measurable volume"}
	case !within.Given():
		return &quantity.NotGivenError{What: "how far a volume may move to a graduation"}
	}
	return nil
}
