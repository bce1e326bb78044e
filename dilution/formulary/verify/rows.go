package verify

import (
	"fmt"
	"math/big"
	"slices"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// overlaps finds rows of one purpose, route and counting whose ages meet: the
// milder of two would win.
func (c *check) overlaps() {
	overlapping(c, c.drug.Doses)
	overlapping(c, c.drug.Rates)
}

func overlapping[T interface{ Basis() quantity.Basis }](c *check, rows []formulary.Rule[T]) {
	for i, a := range rows {
		for _, b := range rows[:i] {
			shared := slices.ContainsFunc(a.Routes, func(r string) bool { return slices.Contains(b.Routes, r) })
			if a.For != b.For || !shared || a.Frail != b.Frail || top(a).Basis() != top(b).Basis() || !meet(a, b) {
				continue
			}
			c.find(refusal.RowsOverlap, a.Pos, "row", a.Ages(), "ages that do not meet those of the row before",
				"two rows for %s hold at once: %q and %q", a.For, b.Ages(), a.Ages())
		}
	}
}

// top is the highest figure of a row.
func top[T any](r formulary.Rule[T]) T {
	for _, f := range []formulary.Figure[T]{r.HardHigh, r.SoftHigh, r.UsualHigh} {
		if f.Given() {
			return f.Value
		}
	}
	return r.UsualHigh.Value
}

func meet[T any](a, b formulary.Rule[T]) bool {
	begins := !b.AgeTo.Given() || !a.AgeFrom.Given() || a.AgeFrom.Less(b.AgeTo)
	ends := !a.AgeTo.Given() || !b.AgeFrom.Given() || b.AgeFrom.Less(a.AgeTo)
	return begins && ends
}

// reach is how many times the maximum by weight the maximum in all may be: for
// children it is often the adult's.
func reach(kg int64) int64 {
	if kg < adult {
		return 10
	}
	return 3
}

// maxima wants first doses, repeats, days and courses to fit the row: the first
// dose and a repeat lie in it, a day or a course holds one dose to some twenty.
func (c *check) maxima() {
	for _, r := range c.drug.Doses {
		kg := weightOf(r)
		low, high := doseOf(r.UsualLow, kg), c.highest(r, kg)
		for _, m := range []struct {
			f           formulary.Figure[quantity.Dose]
			what        string
			under, over int64 // times the usual lowest that it may fall short of, times the highest that it may pass
		}{
			{r.FirstMax, "highest first dose", 1, 1}, {r.RepeatMax, "highest repeat", 3, 1},
			{r.DayMax, "maximum of a day", 1, 25}, {r.CourseMax, "maximum of a course", 1, 25},
		} {
			x := doseOf(m.f, kg)
			if x.value == nil {
				continue
			}
			if low.value != nil && new(big.Rat).Mul(x.value, big.NewRat(m.under, 1)).Cmp(low.value) < 0 {
				c.find(refusal.KeyConflict, x.pos, "row", x.f, "at least one usual lowest dose, "+low.f, "the %s for %s is below one usual dose", m.what, r.For)
			}
			if high.value != nil && apart(high.value, x.value, m.over) {
				c.find(refusal.KeyConflict, x.pos, "row", x.f, fmt.Sprintf("at most %d times the highest dose, %s", m.over, high.f), "the %s for %s is too far above the highest dose", m.what, r.For)
			}
			if m.over > 1 && high.value != nil && x.value.Cmp(new(big.Rat).Mul(high.value, big.NewRat(9, 10))) < 0 {
				c.find(refusal.KeyConflict, x.pos, "row", x.f, "at least the highest dose, "+high.f, "the %s for %s is below the highest dose of the row", m.what, r.For)
			}
		}
	}
	c.localMaxima()
}

// highest is what one dose of a row may come to: its highest figure, or its
// absolute maximum where that is lower.
func (c *check) highest(r formulary.Rule[quantity.Dose], kg int64) scaled {
	high := scaled{}
	for _, f := range []formulary.Figure[quantity.Dose]{r.UsualHigh, r.SoftHigh, r.HardHigh} {
		if x := doseOf(f, kg); x.value != nil {
			high = x
		}
	}
	if most := r.TotalMax; most.Given() && most.Value.Kind() == c.drug.Kind && (high.value == nil || most.Value.Rat().Cmp(high.value) < 0) {
		high = scaled{most.Text, most.Value.Rat(), most.Pos}
	}
	return high
}

func (c *check) localMaxima() {
	for _, m := range c.drug.LocalMaxima {
		kg := weightOf(formulary.Rule[quantity.Dose]{AgeFrom: m.AgeFrom, AgeTo: m.AgeTo})
		x := doseOf(m.PerKg, kg)
		if s, kin, ok := sizeOf(c.drug); ok && x.value != nil && !s.dose.holds(perKilogram(x.value, kg)) {
			c.find(refusal.Implausible, x.pos, "per_kg", x.f, s.dose.low+" to "+s.dose.high+" mg/kg", "the maximum is far from those of %s; is a unit wrong?", kin)
		}
		total := scaled{m.Total.Text, nil, m.Total.Pos}
		if m.Total.Given() && m.Total.Value.Kind() == c.drug.Kind {
			total.value = m.Total.Value.Rat()
		}
		if x.value != nil && total.value != nil && (apart(x.value, total.value, reach(kg)) || apart(total.value, x.value, 3)) {
			c.find(refusal.Implausible, m.Total.Pos, "total", m.Total.Text, "within a factor of three of the maximum by weight at 70 kg, "+x.f, "the two maxima do not fit each other")
		}
		day := doseOf(m.DayMax, kg)
		if day.value != nil && total.value != nil && (day.value.Cmp(total.value) < 0 || apart(total.value, day.value, 8)) {
			c.find(refusal.KeyConflict, day.pos, "day_max", day.f, "one to eight times the maximum of one dose, "+total.f, "the maximum of a day and that of one dose do not fit")
		}
	}
}

// courses wants the most that an infusion may give to be what its rates give in
// ten minutes to two days, and in no more than the time it may run.
func (c *check) courses() {
	for _, r := range c.drug.Rates {
		kg := weightOf(r)
		course, low, high := doseOf(r.CourseMax, kg), rateOf(r.UsualLow, kg), rateOf(r.UsualHigh, kg)
		if course.value == nil || high.value == nil {
			continue
		}
		hours := new(big.Rat).Quo(course.value, high.value)
		if !(span{"0.16", "48"}).holds(hours) {
			c.find(refusal.Implausible, course.pos, "course_max", course.f, "what the usual highest rate, "+high.f+", gives in ten minutes to two days",
				"the most that may be given for %s and the dose rates do not fit", r.For)
		}
		if least := firstValue(low, high); r.Longest.Given() {
			run := big.NewRat(int64(r.Longest.Value.Minutes()), 60)
			if apart(new(big.Rat).Mul(high.value, run), course.value, 2) || apart(course.value, new(big.Rat).Mul(least, run), 8) {
				c.find(refusal.Implausible, course.pos, "course_max", course.f, "about what the usual rates give in "+r.Longest.Text,
					"the most that may be given for %s and the longest time do not fit", r.For)
			}
		}
	}
}

func firstValue(list ...scaled) *big.Rat {
	for _, x := range list {
		if x.value != nil {
			return x.value
		}
	}
	return nil
}
