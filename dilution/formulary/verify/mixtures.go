package verify

import (
	"math/big"
	"slices"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// mixtures holds everything that is said of concentrations against the bounds of
// the drug: undiluted containers, limits of diluents, and the concentrations that
// a time in use was shown for.
func (c *check) mixtures() {
	low, high := c.ends()
	c.undiluted()
	if low == nil {
		return
	}
	for _, p := range c.drug.Presentations {
		for _, d := range p.Diluents {
			c.within(d.Low, "diluent.low", "the lowest concentration in "+d.Name, low, high)
			c.within(d.High, "diluent.high", "the highest concentration in "+d.Name, low, high)
		}
	}
	// A time may have been shown for a concentration beside those in use.
	beside := func(r *big.Rat, a, b int64) *big.Rat { return new(big.Rat).Mul(r, big.NewRat(a, b)) }
	for _, s := range c.drug.Stability {
		what := "a concentration of the time in use of " + s.Text
		c.within(s.Low, "stability.low", what, beside(low, 1, 15), high)
		c.within(s.High, "stability.high", what, beside(low, 1, 15), beside(high, 15, 1))
		if s.Low.Given() && s.High.Given() {
			if n, err := s.Low.Value.Cmp(s.High.Value); err != nil || n > 0 || apart(s.Low.Value.Rat(), s.High.Value.Rat(), 150) {
				c.find(refusal.KeyConflict, s.Low.Pos, "stability.low", s.Low.Text, "not above the highest, "+s.High.Text+", nor a 150th of it",
					"the concentrations of a time in use do not make a range")
			}
		}
	}
}

// ends is the lowest and the highest concentration that the record allows for any
// use, nil when it has no bounds for some use of a container.
func (c *check) ends() (low, high *big.Rat) {
	for _, p := range c.drug.Presentations {
		for _, use := range p.Uses {
			if !slices.ContainsFunc(c.drug.Bounds, func(b formulary.Bounds) bool { return b.Use == use }) {
				return nil, nil
			}
		}
	}
	for _, b := range c.drug.Bounds {
		if !b.Low.Given() || !b.High.Given() {
			continue
		}
		if x := b.Low.Value.Rat(); low == nil || x.Cmp(low) < 0 {
			low = x
		}
		if x := b.High.Value.Rat(); high == nil || x.Cmp(high) > 0 {
			high = x
		}
	}
	return low, high
}

func (c *check) within(f formulary.Figure[quantity.Concentration], field, what string, low, high *big.Rat) {
	if !f.Given() || f.Value.Rat().Cmp(low) >= 0 && f.Value.Rat().Cmp(high) <= 0 {
		return
	}
	c.find(refusal.Implausible, f.Pos, field, f.Text, "a concentration within the bounds of the drug",
		"%s, %s, is outside everything that the drug may be made up to", what, f.Text)
}

// undiluted wants a container that may be used as it comes to lie inside some
// bounds of its uses, and bounds that containers fill, of a use for which nothing is
// diluted, to begin at the weakest of them.
func (c *check) undiluted() {
	weakest, diluted := map[string]*big.Rat{}, map[string]bool{}
	for _, p := range c.drug.Presentations {
		conc, err := p.Amount.In(p.Volume)
		inside := len(c.drug.Bounds) == 0 || err != nil || !p.Neat
		for _, use := range p.Uses {
			diluted[use] = diluted[use] || len(p.Diluents) > 0
			if err != nil {
				continue
			}
			if x := conc.Rat(); weakest[use] == nil || x.Cmp(weakest[use]) < 0 {
				weakest[use] = x
			}
			inside = inside || slices.ContainsFunc(c.drug.Bounds, func(b formulary.Bounds) bool {
				return b.Use == use && b.Low.Given() && b.High.Given() && conc.Rat().Cmp(b.Low.Value.Rat()) >= 0 && conc.Rat().Cmp(b.High.Value.Rat()) <= 0
			})
		}
		if !inside {
			c.find(refusal.Implausible, p.Pos, "neat", p.ID, "bounds that hold its strength",
				"%s may be used undiluted, and no bounds of concentration hold it", p.ID)
		}
	}
	for _, b := range c.drug.Bounds {
		if w := weakest[b.Use]; w != nil && !diluted[b.Use] && b.Low.Given() && b.High.Given() && b.High.Value.Rat().Cmp(w) >= 0 && apart(b.Low.Value.Rat(), w, 4) {
			c.find(refusal.Implausible, b.Low.Pos, "low", b.Low.Text, "about the weakest container: nothing is diluted for this use",
				"the lowest concentration for %s, %s, is far below every container, and none is diluted", b.Use, b.Low.Text)
		}
	}
}
