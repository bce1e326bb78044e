package dilution

import (
	"math/big"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
)

// WeightMade is the amount of drug for a syringe of final volume v that fits one
// body weight: each 1 mL/h of it gives the dose rate each. In 100 mL and for 1
// microgram/kg/min that is the "rule of six", 6 mg for each kg; in 50 mL the
// "rule of three". Errors: *quantity.BasisError unless each is per kg;
// *quantity.NotGivenError.
func WeightMade(each quantity.DoseRate, weight quantity.BodyWeight, v quantity.Volume) (quantity.Amount, error) {
	hourly, err := each.For(weight)
	if err != nil {
		return quantity.Amount{}, err
	}
	if !v.Given() {
		return quantity.Amount{}, &quantity.NotGivenError{What: "final volume"}
	}
	// Rat counts base units an hour; 1 mL/h gives that much with each mL.
	base := baseUnit(each.Kind())
	return quantity.AmountOf(new(big.Rat).Mul(hourly.Rat(), v.Rat()), base), nil
}

// baseUnit is the unit in which a kind is counted inside.
func baseUnit(k quantity.Kind) quantity.Unit {
	switch k {
	case quantity.ByMass:
		return quantity.Milligram()
	case quantity.ByActivity:
		return quantity.Units()
	case quantity.BySubstance:
		return quantity.Millimole()
	}
	return quantity.Unit{}
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
