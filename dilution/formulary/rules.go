package formulary

import (
	"drawup/dilution/body"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

func (r *reader) doseRule(rec doseRecord, path ...any) Rule[quantity.Dose] {
	at := func(key string) []any { return append(append([]any{}, path...), key) }
	rule := Rule[quantity.Dose]{For: rec.For, Routes: rec.Routes, Pos: r.places.Of(path...),
		AgeFrom: r.age(rec.AgeFrom, at("age_from")...), AgeTo: r.age(rec.AgeTo, at("age_to")...),
		HardLow:   figure(r, rec.HardLow, quantity.ParseDose, at("hard_low")...),
		UsualLow:  figure(r, rec.UsualLow, quantity.ParseDose, at("usual_low")...),
		UsualHigh: figure(r, rec.UsualHigh, quantity.ParseDose, at("usual_high")...),
		SoftHigh:  figure(r, rec.SoftHigh, quantity.ParseDose, at("soft_high")...),
		HardHigh:  figure(r, rec.HardHigh, quantity.ParseDose, at("hard_high")...),
		TotalMax:  figure(r, rec.TotalMax, quantity.ParseAmount, at("total_max")...),
		FirstMax:  figure(r, rec.FirstMax, quantity.ParseDose, at("first_max")...),
		RepeatMax: figure(r, rec.RepeatMax, quantity.ParseDose, at("repeat_max")...),
		DayMax:    figure(r, rec.DayMax, quantity.ParseDose, at("day_max")...),
		CourseMax: figure(r, rec.CourseMax, quantity.ParseDose, at("course_max")...),

		RepeatAfter: figure(r, rec.RepeatAfter, parseSpan, at("repeat_after")...),
		Frail:       rec.Frail}
	rule.By, rule.BySource = r.scalar(rec.By, rec.BySource, at("by"))
	whomFor(r, rule, path)
	inOrder(r, rule, quantity.Dose.Cmp, path)
	return rule
}

func (r *reader) rateRule(rec infusionRecord, path ...any) Rule[quantity.DoseRate] {
	at := func(key string) []any { return append(append([]any{}, path...), key) }
	rule := Rule[quantity.DoseRate]{For: rec.For, Routes: rec.Routes, Pos: r.places.Of(path...),
		AgeFrom: r.age(rec.AgeFrom, at("age_from")...), AgeTo: r.age(rec.AgeTo, at("age_to")...),
		HardLow:   figure(r, rec.HardLow, quantity.ParseDoseRate, at("hard_low")...),
		UsualLow:  figure(r, rec.UsualLow, quantity.ParseDoseRate, at("usual_low")...),
		UsualHigh: figure(r, rec.UsualHigh, quantity.ParseDoseRate, at("usual_high")...),
		SoftHigh:  figure(r, rec.SoftHigh, quantity.ParseDoseRate, at("soft_high")...),
		HardHigh:  figure(r, rec.HardHigh, quantity.ParseDoseRate, at("hard_high")...),
		CourseMax: figure(r, rec.CourseMax, quantity.ParseDose, at("course_max")...),
		Longest:   figure(r, rec.Longest, parseSpan, at("longest")...),
		Frail:     rec.Frail}
	rule.By, rule.BySource = r.scalar(rec.By, rec.BySource, at("by"))
	whomFor(r, rule, path)
	inOrder(r, rule, quantity.DoseRate.Cmp, path)
	return rule
}

// whomFor wants a row to say what it is for, by which routes, and from a younger
// age to an older one.
func whomFor[T any](r *reader, rule Rule[T], path []any) {
	if rule.For == "" || len(rule.Routes) == 0 {
		r.fault(refusal.KeyMissing, rule.For, "an indication and at least one route", "the row does not say what it is for", path...)
	}
	r.ageOrder(rule.AgeFrom, rule.AgeTo, path)
}

// ageOrder refuses ages that nobody has: from one to the same or a younger one.
func (r *reader) ageOrder(from, to body.Age, path []any) {
	if from.Given() && to.Given() && !from.Less(to) {
		r.fault(refusal.KeyConflict, from.String()+" to "+to.String(), "a younger age before an older one",
			"the ages of the row hold nobody", path...)
	}
}

// scalar reads which body weight a row goes by, and where that is said.
func (r *reader) scalar(by, source string, path []any) (body.Kind, Source) {
	kind, ok := body.KindNamed(by)
	if !ok {
		r.fault(refusal.ValueUnknown, by, "actual, ideal, adjusted, lean, surface or none",
			"the row does not say which weight it goes by", path...)
	}
	if source == "" {
		return kind, Source{}
	}
	return kind, r.source(source, path...)
}

// inOrder checks hard low ≤ usual low ≤ usual high ≤ soft high ≤ hard high,
// all counted the same way.
func inOrder[T any](r *reader, rule Rule[T], cmp func(T, T) (int, error), path []any) {
	var last Figure[T]
	for _, f := range []Figure[T]{rule.HardLow, rule.UsualLow, rule.UsualHigh, rule.SoftHigh, rule.HardHigh} {
		if !f.Given() {
			continue
		}
		if last.Given() {
			if n, err := cmp(last.Value, f.Value); err != nil || n > 0 {
				r.fault(refusal.KeyConflict, last.Text+" before "+f.Text,
					"limits that rise from hard low to hard high, in one unit family",
					"the limits of the row are out of order", path...)
			}
		}
		last = f
	}
	if !rule.UsualHigh.Given() && !rule.SoftHigh.Given() && !rule.HardHigh.Given() {
		r.fault(refusal.KeyMissing, "", "at least one upper figure", "the row has no upper figure at all", path...)
	}
}
