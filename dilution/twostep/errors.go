package twostep

import (
	"fmt"
	"math/big"

	"drawup/dilution/quantity"
	"drawup/dilution/syringe"
)

func missing(what string) error { return &quantity.NotGivenError{What: what} }

// A DisagreeError says that amount, volume and concentration contradict each
// other.
type DisagreeError struct {
	Amount        quantity.Amount
	Volume        quantity.Volume
	Concentration quantity.Concentration
}

// Error says what was got and what is wanted.
func (e *DisagreeError) Error() string {
	return fmt.Sprintf("got %s %v in %s mL and %s %v/mL, want an amount and a concentration that agree; leave one out",
		e.Amount.Exact(e.Amount.Unit()), e.Amount.Unit(), e.Volume.Exact(),
		e.Concentration.Exact(e.Concentration.Unit()), e.Concentration.Unit())
}

// A NotWeakerError says that the target is no dilution of the strength.
type NotWeakerError struct {
	Strength, Target quantity.Concentration
}

// Error says what was got and what is wanted.
func (e *NotWeakerError) Error() string {
	u := e.Strength.Unit()
	return fmt.Sprintf("got a target of %s %v/mL, want less than the strength, %s %v/mL",
		e.Target.Exact(u), u, e.Strength.Exact(u), u)
}

// A BoundsError says that no concentration lies between the bounds of the
// intermediate dilution.
type BoundsError struct {
	Low, High quantity.Concentration
}

// Error says what was got and what is wanted.
func (e *BoundsError) Error() string {
	u := e.High.Unit()
	return fmt.Sprintf("got an intermediate of at least %s %v/mL, want no more than its upper bound, %s %v/mL",
		e.Low.Exact(u), u, e.High.Exact(u), u)
}

// An UnreadableError says that no giving syringe shows the final volume.
// Nearest is the nearest volume that one shows; not given if none holds it.
type UnreadableError struct {
	Volume, Nearest quantity.Volume
}

// nearer keeps the line closest to the volume; of two the larger.
func (e *UnreadableError) nearer(v quantity.Volume) {
	off := func(v quantity.Volume) *big.Rat {
		d := new(big.Rat).Sub(v.Rat(), e.Volume.Rat())
		return d.Abs(d)
	}
	if v.IsZero() {
		return
	}
	if e.Nearest.Given() {
		if n := off(v).Cmp(off(e.Nearest)); n > 0 || n == 0 && v.Cmp(e.Nearest) < 0 {
			return
		}
	}
	e.Nearest = v
}

// Error says what was got and what is wanted.
func (e *UnreadableError) Error() string {
	if e.Nearest.Given() {
		return fmt.Sprintf("got a final volume of %s mL, want one that a giving syringe shows, such as %s mL", e.Volume.Exact(), e.Nearest.Exact())
	}
	return fmt.Sprintf("got a final volume of %s mL, want one that a giving syringe holds and shows", e.Volume.Exact())
}

// A NoneError says that no intermediate dilution comes near enough. Nearest is
// the one that comes nearest, nil if not even a distant one can be made.
type NoneError struct {
	Within  quantity.Percent
	Nearest *Plan
	Weighed int
	Bounded bool // the search stopped at its bound
}

// Error says what was got and what is wanted.
func (e *NoneError) Error() string {
	s := fmt.Sprintf("got no intermediate dilution within %s %%, want one", e.Within.Exact())
	if e.Nearest != nil {
		s += fmt.Sprintf("; the nearest of %d is %s %% off", e.Weighed, e.Nearest.Error.Rat().FloatString(2))
	}
	if e.Bounded {
		s += fmt.Sprintf("; the search stopped at its bound of %d", bound)
	}
	return s
}

// A TooFineError says that the graduations are too many, or fit no common grid
// that is coarse enough to search. Lines is 0 if it is the grid.
type TooFineError struct {
	Lines int64
}

// Error says what was got and what is wanted.
func (e *TooFineError) Error() string {
	if e.Lines > 0 {
		return fmt.Sprintf("got syringes with %d lines, want at most %d in all: check the graduations", e.Lines, mostLines)
	}
	return fmt.Sprintf("got graduations that share no grid, want one of at most %d parts for the largest syringe: check the graduations", mostUnits)
}

// An ImbalanceError says that drug drawn is not drug taken on plus drug left
// over (rule R6): a fault of ours.
type ImbalanceError struct {
	Drawn, Taken, Left quantity.Amount
}

// Error says what was got and what is wanted.
func (e *ImbalanceError) Error() string {
	u := e.Drawn.Unit()
	return fmt.Sprintf("got %s %v drawn, %s taken on and %s left, want them to balance",
		e.Drawn.Exact(u), u, e.Taken.Exact(u), e.Left.Exact(u))
}

// An OffLineError says that a volume cannot be read on a syringe: it is between
// the lines, or so little that its tolerance is all of it.
type OffLineError struct {
	Volume quantity.Volume
	Barrel syringe.Barrel
}

// Error says what was got and what is wanted.
func (e *OffLineError) Error() string {
	return fmt.Sprintf("got %s mL in a %s mL syringe, want a multiple of %s mL that is more than its tolerance",
		e.Volume.Exact(), e.Barrel.Nominal().Exact(), e.Barrel.Step().Exact())
}
