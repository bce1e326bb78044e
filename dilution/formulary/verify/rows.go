package verify

import (
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

// maxima wants first doses, repeats, days and courses to rise: a day holds at
// least one usual dose, a course at least a day's least.
func (c *check) maxima() {
	for _, r := range c.drug.Doses {
		kg := weightOf(r)
		low, high := doseOf(r.UsualLow, kg), doseOf(r.UsualHigh, kg)
		for _, m := range []struct {
			f    formulary.Figure[quantity.Dose]
			what string
		}{{r.FirstMax, "highest first dose"}, {r.RepeatMax, "highest repeat"}, {r.DayMax, "maximum of a day"}, {r.CourseMax, "maximum of a course"}} {
			x := doseOf(m.f, kg)
			if x.value == nil {
				continue
			}
			if low.value != nil && x.value.Cmp(low.value) < 0 && m.what != "highest repeat" {
				c.find(refusal.KeyConflict, x.pos, "row", x.f, "at least the usual lowest dose, "+low.f, "the %s for %s is below one usual dose", m.what, r.For)
			}
			if high.value != nil && apart(high.value, x.value, 60) {
				c.find(refusal.Implausible, x.pos, "row", x.f, "within a factor of 60 of the usual highest dose, "+high.f, "the %s for %s is far above one usual dose", m.what, r.For)
			}
		}
	}
	for _, m := range c.drug.LocalMaxima {
		kg := weightOf(formulary.Rule[quantity.Dose]{AgeFrom: m.AgeFrom, AgeTo: m.AgeTo})
		x := doseOf(m.PerKg, kg)
		if s, ok := sizeOf(c.drug.Class); ok && x.value != nil && !s.dose.holds(perKilogram(x.value, kg)) {
			c.find(refusal.Implausible, x.pos, "per_kg", x.f, s.dose.low+" to "+s.dose.high+" mg/kg", "the maximum is far from those of the class %s; is a unit wrong?", c.drug.Class)
		}
		if x.value != nil && m.Total.Given() && m.Total.Value.Kind() == c.drug.Kind && (apart(x.value, m.Total.Value.Rat(), reach(kg)) || apart(m.Total.Value.Rat(), x.value, 3)) {
			c.find(refusal.Implausible, m.Total.Pos, "total", m.Total.Text, "within a factor of three of the maximum by weight, "+x.f+", of a child of ten", "the two maxima do not fit each other")
		}
	}
}
