package dilution

import (
	"fmt"
	"math/big"
	"slices"
	"strings"

	"drawup/dilution/formulary"
	"drawup/dilution/order"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/dilution/syringe"
)

// drawnRound are the volumes, in hundredths of a mL, that a dilution draws: round
// figures that every scale shows, besides one whole container.
func drawnRound() []int64 {
	return []int64{10, 20, 25, 40, 50, 100, 200, 250, 400, 500, 1000, 2000}
}

// dilutions are the ways to dilute the dose of the order so that it can be
// measured: a round volume of a stocked presentation, or a whole container, made
// up to the full capacity of a stocked syringe, to a concentration that the
// formulary allows and that paper shows exactly. They come by the total error of
// the dose, the smallest first, then by containers, drug wasted, final volume.
func (w *work) dilutions(neat []way) []way {
	var all []dilutionWay
	for _, y := range neat {
		t := w.try(y, 0) // fills in the strength
		drawn := t.drawnVolumes(y.sizes[0])
		for _, b := range w.site.barrels {
			if w.o.Size.Given() && b.Nominal().Cmp(w.o.Size.Value) != 0 {
				continue
			}
			for _, r := range drawn {
				if x, ok := t.dilution(y, b, r); ok {
					all = append(all, x)
				}
			}
		}
	}
	slices.SortStableFunc(all, func(a, b dilutionWay) int { return comparePoints(a.points, b.points) })
	if len(all) > mostWays {
		all = all[:mostWays] // the rest has more error
	}
	out := make([]way, len(all))
	for i, x := range all {
		out[i] = x.way
	}
	return out
}

// A dilutionWay is a way with the reading of the dose.
type dilutionWay struct{ way }

// drawnVolumes are the volumes to draw from a presentation, each of which stands
// on a line.
func (w *work) drawnVolumes(p formulary.Presentation) []syringe.Reading {
	volumes := []quantity.Volume{p.Volume}
	for _, n := range drawnRound() {
		if v := quantity.Millilitres(big.NewRat(n, 100)); v.Cmp(p.Volume) != 0 {
			volumes = append(volumes, v)
		}
	}
	var out []syringe.Reading
	for _, v := range volumes {
		if !v.Given() {
			continue
		}
		r, err := syringe.Measure(v, w.site.barrels, w.site.smallest, w.site.tolerance)
		if err == nil && r.MovedPercent.Sign() == 0 {
			out = append(out, r)
		}
	}
	return out
}

// dilution is one way: the drawn volume made up to the full syringe. False where
// the dose cannot be read then, or the formulary does not allow it.
func (w *work) dilution(y way, b syringe.Barrel, drawn syringe.Reading) (dilutionWay, bool) {
	a, err := drawn.Volume.Holds(w.plan.Mixture.Strength)
	if err != nil || drawn.Volume.Cmp(b.Nominal()) >= 0 {
		return dilutionWay{}, false
	}
	c, err := a.In(b.Nominal())
	if err != nil || !shownExactly(c) || !w.allows(c) {
		return dilutionWay{}, false
	}
	dose, err := w.plan.Dose.Amount.DrawnAt(c)
	if err != nil {
		return dilutionWay{}, false
	}
	look := b.Look(dose)
	if !look.Holds || look.Line.IsZero() || look.Line.Cmp(w.site.smallest) < 0 {
		return dilutionWay{}, false
	}
	moved := new(big.Rat).Quo(look.Moved, dose.Rat())
	if moved.Mul(moved, big.NewRat(100, 1)); moved.Cmp(w.site.tolerance.Rat()) > 0 {
		return dilutionWay{}, false
	}
	o := y.o
	o.Concentration = order.Field[quantity.Concentration]{Value: c, Text: c.Exact(c.Best()) + " " + c.Best().String() + "/mL", Pos: o.Dose.Pos}
	o.Volume = order.Field[quantity.Volume]{Value: b.Nominal(), Text: b.Nominal().Exact() + " mL", Pos: o.Dose.Pos}
	o.Dilute = order.Field[bool]{}
	x := dilutionWay{way{o: o, sizes: y.sizes, allowed: y.allowed, place: y.place}}
	s := w.plan.Style
	x.variant = fmt.Sprintf("%s made up to %s", s.Volume(drawn.Volume), s.Volume(b.Nominal()))
	x.name = joinAnd(ids(y.sizes)) + ", " + x.variant
	x.points = w.dilutionPoints(y, b, drawn, look, moved)
	return x, true
}

// dilutionPoints are what counts between dilutions.
func (w *work) dilutionPoints(y way, b syringe.Barrel, drawn syringe.Reading, look syringe.Look, moved *big.Rat) []point {
	s := w.plan.Style
	sum := new(big.Rat).Add(moved, drawn.Relative().Rat())
	sum.Add(sum, relative(b, b.Nominal()).Rat())
	sum.Add(sum, relative(b, look.Line).Rat())
	whole := new(big.Int).Neg(new(big.Int).Div(new(big.Int).Neg(sum.Num()), sum.Denom())) // up to a whole per cent
	n, err := drawn.Volume.Containers(y.sizes[0].Volume)
	if err != nil {
		n = 10000
	}
	left := new(big.Rat).Sub(y.sizes[0].Volume.Times(n).Rat(), drawn.Volume.Rat())
	left.Mul(left, w.plan.Mixture.Strength.Rat())
	held, err := drawn.Volume.Holds(w.plan.Mixture.Strength)
	if err == nil {
		left.Add(left, held.Rat())
	}
	left.Sub(left, w.plan.Dose.Amount.Rat())
	kind := w.plan.Drug.Kind
	return []point{
		{new(big.Rat).SetInt(whole), func() string { return fmt.Sprintf("a total error of at most %d %%", whole) }},
		{big.NewRat(int64(n), 1), func() string { return counting(n, "container") }},
		{left, func() string { return s.Amount(quantity.AmountOf(left, baseUnit(kind))) + " discarded" }},
		{b.Nominal().Rat(), func() string { return s.Volume(b.Nominal()) + " in all" }},
	}
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

// shownExactly reports that four digits hold the concentration, so that label
// and order say exactly what is in the syringe.
func shownExactly(c quantity.Concentration) bool {
	text := c.Exact(c.Best())
	digits := strings.Trim(strings.Replace(text, ".", "", 1), "0")
	return !strings.Contains(text, "/") && len(digits) <= 4
}

// allows reports that the formulary's bounds hold a concentration for this use,
// without saying why not: the way itself is worked in full afterwards.
func (w *work) allows(c quantity.Concentration) bool {
	rows, _ := w.boundsFor(w.line())
	for _, b := range rows {
		low, err1 := c.Cmp(b.Low.Value)
		high, err2 := c.Cmp(b.High.Value)
		if err1 != nil || err2 != nil || low < 0 || high > 0 {
			return false
		}
	}
	return len(rows) > 0
}

// diluted cautions that a dose ordered alone is diluted, because its neat volume
// cannot be measured.
func (w *work) diluted() {
	if !w.plan.Order.Dilute.Value || !w.o.Concentration.Given() {
		return
	}
	s, m := w.plan.Style, w.plan.Mixture
	w.caution(refusal.Reason{
		Code: refusal.DilutedToMeasure, Field: "dose", Got: "the neat dose", Want: "a volume that can be measured", Rule: "R8", Pos: w.plan.Order.Dose.Pos,
		Message: fmt.Sprintf("the neat dose cannot be measured, so it is diluted to %s; the syringe holds more than one dose", s.Concentration(m.Concentration)),
		Remedy:  "give the volume of the dose, never the whole syringe; discard the rest",
	})
}
