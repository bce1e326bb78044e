package verify

import (
	"math/big"
	"slices"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// volumes wants a usual dose to be a volume that somebody can draw: with some
// mixture that the record allows the lowest is 0.04 mL or more, and the highest two
// litres or less, which is dantrolene for a crisis. Both are our own choice.
func (c *check) volumes(r formulary.Rule[quantity.Dose], low, high scaled, kg int64) {
	var thinnest, strongest *big.Rat
	for _, b := range c.drug.Bounds {
		meets := len(b.Routes) == 0 || slices.ContainsFunc(b.Routes, func(s string) bool { return slices.Contains(r.Routes, s) })
		if b.Use != "bolus" || !meets || !b.Low.Given() || !b.High.Given() {
			continue
		}
		if x := b.Low.Value.Rat(); thinnest == nil || x.Cmp(thinnest) < 0 {
			thinnest = x
		}
		if x := b.High.Value.Rat(); strongest == nil || x.Cmp(strongest) > 0 {
			strongest = x
		}
	}
	if thinnest == nil {
		return
	}
	if x := firstScaled(low, high); x.value != nil && new(big.Rat).Quo(x.value, thinnest).Cmp(big.NewRat(1, 25)) < 0 {
		c.find(refusal.Implausible, x.pos, "dose", x.f, "0.04 mL or more of the thinnest mixture",
			"the dose of %s for %s is no volume that can be measured, however thin the syringe", x.f, r.For)
	}
	if high.value != nil && apart(strongest, high.value, 700) {
		c.find(refusal.Implausible, high.pos, "dose", high.f, "700 mL or less of the strongest mixture",
			"the dose of %s for %s is more volume than anybody injects, however strong the syringe", high.f, r.For)
	}
}

func firstScaled(list ...scaled) scaled {
	for _, x := range list {
		if x.value != nil {
			return x
		}
	}
	return scaled{}
}
