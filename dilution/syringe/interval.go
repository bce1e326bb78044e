package syringe

import (
	"math/big"

	"drawup/dilution/quantity"
)

// Interval combines relative half widths, each in per cent and taken as
// rectangular, into the half width within which the concentration lies (rule
// R9): the smaller of 2 u, with u² the sum of a²/3 (GUM, ISO/IEC Guide 98-3,
// coverage factor 2), and the plain sum of the a, which 2 u can pass where one
// part dominates. It is rounded half up to 0.1 %; squares are compared in whole
// numbers and no root is rounded before. No parts give 0 %. Parts that are
// correlated, such as two readings of one barrel, are not for this rule.
// Error: *quantity.NotGivenError.
func Interval(parts ...quantity.Percent) (quantity.Percent, error) {
	sum, squares := new(big.Rat), new(big.Rat)
	for _, p := range parts {
		if !p.Given() || p.Rat().Sign() < 0 {
			return quantity.Percent{}, &quantity.NotGivenError{What: "a part of the interval"}
		}
		a := p.Rat()
		sum.Add(sum, a)
		squares.Add(squares, a.Mul(a, a))
	}
	tenths := tenthsOfRoot(squares.Mul(squares, big.NewRat(4, 3)))
	if plain := tenthsOf(sum); plain.Cmp(tenths) < 0 {
		tenths = plain
	}
	return quantity.PerCent(new(big.Rat).SetFrac(tenths, big.NewInt(10))), nil
}

// tenthsOf is r in tenths, half up.
func tenthsOf(r *big.Rat) *big.Int {
	x := new(big.Rat).Add(new(big.Rat).Mul(r, big.NewRat(10, 1)), big.NewRat(1, 2))
	return new(big.Int).Div(x.Num(), x.Denom())
}

// tenthsOfRoot is the root of r in tenths, half up: with m the whole part of
// the root of 400 r, which is 20 times the root, it is the whole part of
// (m + 1)/2.
func tenthsOfRoot(r *big.Rat) *big.Int {
	x := new(big.Rat).Mul(r, big.NewRat(400, 1))
	m := new(big.Int).Sqrt(new(big.Int).Div(x.Num(), x.Denom()))
	return m.Rsh(m.Add(m, big.NewInt(1)), 1)
}
