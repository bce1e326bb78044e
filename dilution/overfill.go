package dilution

import (
	"fmt"
	"math/big"

	"drawup/dilution/quantity"
)

// A Fluidity says how a fluid flows out of its container. The zero value means
// "not given".
type Fluidity int

// Fluidities that the pharmacopoeia tells apart.
const (
	Mobile Fluidity = iota + 1
	Viscous
)

// FluidityNamed reads mobile and viscous.
func FluidityNamed(s string) (Fluidity, bool) {
	switch s {
	case "mobile":
		return Mobile, true
	case "viscous":
		return Viscous, true
	}
	return 0, false
}

// OverfillSource is where the recommended excess is written down.
const OverfillSource = "USP 29-NF 24, general chapter 1151, excess volume of injections"

// An OverfillUnlisted says that the pharmacopoeia's table has no row for a
// labelled volume; nothing is put between two rows.
type OverfillUnlisted struct{ Got quantity.Volume }

// Error says what was got and what is wanted.
func (e *OverfillUnlisted) Error() string {
	return fmt.Sprintf("got %s mL, want a labelled volume of %s mL, or of 50 mL and more", e.Got.Exact(), "0.5, 1, 2, 5, 10, 20 or 30")
}

// Overfill is the excess that the pharmacopoeia recommends beyond the labelled
// volume of an ampoule or vial: what the container should hold more than it
// says. It is the maker's business and no dose; a dose goes by a measured
// volume. From 50 mL on it is 2 % of a mobile and 3 % of a viscous fluid. Errors:
// *quantity.NotGivenError; *OverfillUnlisted.
func Overfill(labelled quantity.Volume, f Fluidity) (quantity.Volume, error) {
	if !labelled.Given() || f != Mobile && f != Viscous {
		return quantity.Volume{}, &quantity.NotGivenError{What: "labelled volume, or whether the fluid is mobile or viscous,"}
	}
	pick := func(mobile, viscous *big.Rat) *big.Rat {
		if f == Viscous {
			return viscous
		}
		return mobile
	}
	v := labelled.Rat()
	if v.Cmp(big.NewRat(50, 1)) >= 0 {
		return quantity.Millilitres(v.Mul(v, pick(big.NewRat(2, 100), big.NewRat(3, 100)))), nil
	}
	for _, row := range [][3]int64{ // in hundredths of a mL: labelled, mobile, viscous
		{50, 10, 12}, {100, 10, 15}, {200, 15, 25}, {500, 30, 50}, {1000, 50, 70}, {2000, 60, 90}, {3000, 80, 120},
	} {
		if v.Cmp(big.NewRat(row[0], 100)) == 0 {
			return quantity.Millilitres(pick(big.NewRat(row[1], 100), big.NewRat(row[2], 100))), nil
		}
	}
	return quantity.Volume{}, &OverfillUnlisted{labelled}
}
