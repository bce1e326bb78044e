package syringe

import (
	"math/big"

	"drawup/dilution/quantity"
	"drawup/dilution/roots"
)

// A Shape says how the values behind a stated width are spread, and so how a
// width becomes a standard uncertainty (GUM, ISO/IEC Guide 98-3, 4.3). The zero
// value is refused.
type Shape int

// Shapes of a width.
const (
	Rectangular Shape = iota + 1 // plus or minus a, all alike: a / root of 3
	Triangular                   // plus or minus a, the middle likelier: a / root of 6
	Standard                     // the width is a standard uncertainty already
)

// String is the shape in words, "" for the zero value.
func (s Shape) String() string {
	switch s {
	case Rectangular:
		return "rectangular"
	case Triangular:
		return "triangular"
	case Standard:
		return "standard"
	}
	return ""
}

// divisor is the square of what a width is divided by; 0 for no shape.
func (s Shape) divisor() int64 {
	switch s {
	case Rectangular:
		return 3
	case Triangular:
		return 6
	case Standard:
		return 1
	}
	return 0
}

// A Width is one thing that makes a value uncertain: how far off it can be, in
// per cent of the value, and its shape. Widths of one syringe that is used twice
// are not independent and are added before they come here.
type Width struct {
	Percent quantity.Percent
	Shape   Shape
}

// An Uncertainty is how sure a value is, in per cent of it.
type Uncertainty struct {
	// Standard is u: the root of the sum of the squares (GUM, 5.1), to 40
	// digits, rounded once.
	Standard quantity.Percent
	// Expanded is U = 2 u, coverage factor 2.
	Expanded quantity.Percent
	// Worst is the plain sum of the widths, exact: all of them off to one side.
	// Not given when a width is a standard uncertainty, which has no end.
	Worst quantity.Percent
}

// Combine works the uncertainty of independent widths, each weighing in full.
// Errors: *quantity.NotGivenError without widths, for one that is missing or
// below zero, and for one without a shape.
func Combine(widths ...Width) (Uncertainty, error) {
	if len(widths) == 0 {
		return Uncertainty{}, &quantity.NotGivenError{What: "a width"}
	}
	sum, squares, bounded := new(big.Rat), new(big.Rat), true
	for _, w := range widths {
		d := w.Shape.divisor()
		if !w.Percent.Given() || w.Percent.Rat().Sign() < 0 || d == 0 {
			return Uncertainty{}, &quantity.NotGivenError{What: "a width, or its shape,"}
		}
		a := w.Percent.Rat()
		sum.Add(sum, a)
		bounded = bounded && w.Shape != Standard
		a.Mul(a, a)
		squares.Add(squares, a.Quo(a, big.NewRat(d, 1)))
	}
	u := new(big.Rat)
	if squares.Sign() > 0 {
		u = roots.Of(squares, 2)
	}
	out := Uncertainty{Standard: quantity.PerCent(u), Expanded: quantity.PerCent(new(big.Rat).Mul(u, big.NewRat(2, 1)))}
	if bounded {
		out.Worst = quantity.PerCent(sum)
	}
	return out, nil
}
