package dilution

import (
	"math/big"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
)

// WeightMade is the amount of drug for a syringe of final volume v that fits one
// body weight: each 1 mL/h of it gives the dose rate each. With micrograms per kg
// and minute that is dose x kg x 60 x mL micrograms; in 100 mL the "rule of six"
// (6 mg for each kg), in 50 mL the "rule of three" (3 mg for each kg), where 1
// mL/h gives 1 microgram/kg/min. It is for reading and making old orders: the
// mixture fits no other patient. Errors: *quantity.BasisError unless each is per
// kg; *quantity.NotGivenError; those of [quantity.Amount.In].
func WeightMade(each quantity.DoseRate, w quantity.BodyWeight, v quantity.Volume) (quantity.Amount, error) {
	rate, err := each.For(w)
	if err != nil {
		return quantity.Amount{}, err
	}
	hour, err := rate.During(quantity.Minutes(big.NewRat(60, 1)))
	if err != nil {
		return quantity.Amount{}, err
	}
	inOne, err := hour.Amount()
	if err != nil {
		return quantity.Amount{}, err
	}
	c, err := inOne.In(quantity.Millilitres(big.NewRat(1, 1)))
	if err != nil {
		return quantity.Amount{}, err
	}
	return v.Holds(c)
}

// NearestStandard is the standard preparation of d whose concentration is
// nearest to c by ratio, of those for this line or any; the first listed wins a
// tie. False: d has none that is counted as c is.
func NearestStandard(d formulary.Drug, c quantity.Concentration, line string) (formulary.Standard, quantity.Concentration, bool) {
	var best formulary.Standard
	var at quantity.Concentration
	var far *big.Rat
	for _, s := range d.Standards {
		got, err := s.Amount.In(s.Volume)
		if err != nil || got.Kind() != c.Kind() || line != "" && s.Line != "any" && s.Line != line {
			continue
		}
		ratio := new(big.Rat).Quo(got.Rat(), c.Rat())
		if ratio.Cmp(one()) < 0 {
			ratio.Inv(ratio)
		}
		if far == nil || ratio.Cmp(far) < 0 {
			best, at, far = s, got, ratio
		}
	}
	return best, at, far != nil
}
