package certainty

import (
	"math/big"

	"drawup/dilution/quantity"
)

// Reach is how far the ends of i lie from the stated concentration, in per cent
// of it: the first below zero, the second above, unless the stated figure itself
// lies outside. Not given for the zero Result.
func (r Result) Reach(i Interval) (low, high quantity.Percent) {
	if !r.Stated.Given() || !i.Low.Given() || !i.High.Given() {
		return low, high
	}
	off := func(c quantity.Concentration) quantity.Percent {
		x := new(big.Rat).Quo(c.Rat(), r.Stated.Rat())
		return perCent(x.Sub(x, big.NewRat(1, 1)))
	}
	return off(i.Low), off(i.High)
}

// A Comparison sets two preparations side by side: -1 where the first is known
// more closely (its interval has the smaller [Interval.Spread]), +1 where the
// second is, 0 where neither.
type Comparison struct {
	GUM, Worst int
}

// Compare sets two preparations of one concentration side by side, such as one
// step against two. Error: *quantity.NotGivenError for a zero Result.
func Compare(a, b Result) (Comparison, error) {
	for _, i := range []Interval{a.GUM, a.Worst, b.GUM, b.Worst} {
		if i.Spread() == nil {
			return Comparison{}, missing("an interval to compare")
		}
	}
	return Comparison{a.GUM.Spread().Cmp(b.GUM.Spread()), a.Worst.Spread().Cmp(b.Worst.Spread())}, nil
}
