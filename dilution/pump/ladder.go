package pump

import (
	"fmt"
	"math/big"

	"drawup/dilution/quantity"
)

// How many rungs a ladder has: enough to titrate by, few enough to read.
// Common practice, no source.
const (
	FewestRungs = 6
	MostRungs   = 12
)

// A RangeError says why no ladder stands between two dose rates.
type RangeError struct {
	From, To quantity.DoseRate
	Why      string
}

// Error says what was got and what is wanted.
func (e *RangeError) Error() string {
	return fmt.Sprintf("got a range from %s to %s: %s", own(e.From), own(e.To), e.Why)
}

// own is d in its own unit, for errors.
func own(d quantity.DoseRate) string {
	if !d.Given() {
		return "nothing"
	}
	return d.Exact() + " " + d.Unit().String() + " per " + d.Period().String()
}

// Ladder is the settings for evenly spaced round dose rates between from and
// to: the multiples of 1, 2, 2.5 or 5 x 10^n, in the unit in which from is
// written, from the first not below from to the last not above to. From and to
// are rungs where they are such multiples themselves.
//
// There are 6 to 12 rungs. Of the spacings that give so many, the one that
// takes in more of the two ends is chosen, then the one nearest to the wanted
// number of rungs, then the finer. Every rung needs at most four significant
// digits, so that paper shows it exactly. Errors: *RangeError for a range that
// is upside down or too narrow, or a wanted number outside 6 to 12; those of
// [Set]; those of comparing from with to.
func Ladder(from, to quantity.DoseRate, rungs int, per Per, c quantity.Concentration, step quantity.FlowRate) ([]Setting, error) {
	low, high, err := ends(from, to)
	if err != nil {
		return nil, err
	}
	if rungs < FewestRungs || rungs > MostRungs {
		return nil, &RangeError{from, to, fmt.Sprintf("got %d rungs, want 6 to 12", rungs)}
	}
	best, ok := bestGrid(low, high, int64(rungs))
	if !ok {
		return nil, &RangeError{from, to, "too narrow for six round dose rates of at most four digits"}
	}
	var list []Setting
	for n := int64(0); n < best.count; n++ {
		share := new(big.Rat).Quo(best.rung(n), low)
		s, err := Set(from.Scaled(share), per, c, step)
		if err != nil {
			return nil, err
		}
		list = append(list, s)
	}
	return list, nil
}

// ends gives both ends as numbers in the unit and period of from.
func ends(from, to quantity.DoseRate) (low, high *big.Rat, err error) {
	if !from.Given() || !to.Given() || from.Rat().Sign() <= 0 {
		return nil, nil, &quantity.NotGivenError{What: "an end of the range"}
	}
	n, err := from.Cmp(to)
	if err != nil {
		return nil, nil, err
	}
	if n >= 0 {
		return nil, nil, &RangeError{from, to, "the lower end is not below the upper end"}
	}
	low, ok := new(big.Rat).SetString(from.Exact())
	if !ok {
		return nil, nil, &RangeError{from, to, "the lower end cannot be read"}
	}
	ratio := new(big.Rat).Quo(to.Rat(), from.Rat())
	return low, ratio.Mul(ratio, low), nil
}
