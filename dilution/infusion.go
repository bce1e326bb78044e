package dilution

import (
	"fmt"
	"math/big"
	"slices"

	"drawup/dilution/body"
	"drawup/dilution/formulary"
	"drawup/dilution/order"
	"drawup/dilution/pump"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// rungs is how many steps a titration ladder aims at.
const rungs = 9

// infusion works the pump card: start rate, range, limits, ladder, slips.
func (w *work) infusion() bool {
	if !w.o.Infusion {
		return true
	}
	start, ok := w.startPart()
	if !ok {
		return false
	}
	part := &start
	w.plan.Infusion = part
	return w.setPump(part) && w.setRange(part) && w.extras(part) && w.longEnough(part)
}

// A started is the verdict of startPart, kept so that it is worked once.
type started struct {
	part InfusionPart
	ok   bool
}

// startPart holds the ordered dose rates against their limits and finds the
// weight or surface that they go by. It does not need the mixture.
func (w *work) startPart() (InfusionPart, bool) {
	if w.started == nil {
		part, ok := w.pickStart()
		w.started = &started{part, ok}
	}
	return w.started.part, w.started.ok
}

func (w *work) pickStart() (InfusionPart, bool) {
	rows, ok := fittingRows(w, w.plan.Drug.Rates, "dose rate")
	if !ok {
		return InfusionPart{}, false
	}
	row, ok := w.pickRate(rows)
	if !ok {
		return InfusionPart{}, false
	}
	part := InfusionPart{Rule: row, Step: w.site.step}
	by := row.By
	if w.o.RateBy.Given() {
		by = w.o.RateBy.Value
	}
	var err error
	if part.Weight, part.Surface, part.By, err = w.scalar(w.o.Start.Value.Basis(), by); err != nil {
		return part, w.sizeFault(err, "start", w.o.Start.Pos)
	}
	w.unlikeWeight(w.o.RateBy.Given(), w.o.RateBy.Value, row.By, row.BySource, w.o.RateBy.Pos)
	w.takenWeight(w.o.RateBy.Given(), part.By, part.Weight, row.BySource, w.o.Start.Pos)
	w.weightNotes(part.By)
	return part, true
}

// per is the weight or surface of the part, for package pump.
func (p *InfusionPart) per() pump.Per {
	switch {
	case p.Weight.Given():
		return pump.PerWeight(p.Weight)
	case p.Surface.Given():
		return pump.PerSurface(p.Surface)
	}
	return pump.PerNothing()
}

// pickRate settles the row for start and range together, as pickDose does.
func (w *work) pickRate(rows []formulary.Rule[quantity.DoseRate]) (formulary.Rule[quantity.DoseRate], bool) {
	rows = countedAlike(rows, w.o.Start.Value.Basis(), quantity.DoseRate.Basis)
	var found []judged
	for _, row := range rows {
		v, err := w.judgeRange(row)
		if err != nil {
			return row, w.sizeFault(err, "start", w.o.Start.Pos)
		}
		found = append(found, judged{row.For, v})
	}
	i, ok := w.settle(found, "start", w.o.Start.Pos)
	if !ok {
		return formulary.Rule[quantity.DoseRate]{}, false
	}
	for _, r := range found[i].verdict.reasons {
		w.add(r)
	}
	return rows[i], found[i].verdict.rank < 3
}

// judgeRange holds the start and the ends of the range against one row.
func (w *work) judgeRange(row formulary.Rule[quantity.DoseRate]) (verdict, error) {
	var all verdict
	for _, f := range []struct {
		field order.Field[quantity.DoseRate]
		name  string
	}{{w.o.Start, "start"}, {w.o.From, "from"}, {w.o.To, "to"}} {
		if !f.field.Given() {
			continue
		}
		v, err := w.judgeRate(row, f.field.Value, f.name, f.field.Pos)
		if err != nil {
			return all, err
		}
		all.rank = max(all.rank, v.rank)
		all.reasons = append(all.reasons, v.reasons...)
	}
	return all, nil
}

// judgeRate holds one dose rate against one row, as absolute rates.
func (w *work) judgeRate(
	row formulary.Rule[quantity.DoseRate],
	rate quantity.DoseRate,
	field string,
	pos refusal.Pos,
) (verdict, error) {
	s, err := w.rateScale(row, rate, field, pos)
	if err != nil {
		return verdict{}, err
	}
	return s.judge(), nil
}

// rateScale is one row with the rate held against it, as absolute rates.
func (w *work) rateScale(
	row formulary.Rule[quantity.DoseRate],
	rate quantity.DoseRate,
	field string,
	pos refusal.Pos,
) (scale, error) {
	by := row.By
	if w.o.RateBy.Given() {
		by = w.o.RateBy.Value
	}
	value, err := w.absoluteRate(rate, by)
	if err != nil {
		return scale{}, err
	}
	s := scale{
		what: "dose rate", field: field,
		value: value, text: w.plan.Style.DoseRate(rate),
		codes: rateCodes, pos: pos,
		acceptedBy: w.o.AcceptedBy.Value, acceptedReason: w.o.AcceptedReason.Value,
	}
	err = fillScale(&s, row, w.plan.Style.DoseRate, func(x quantity.DoseRate) (*big.Rat, error) {
		return w.absoluteRate(x, row.By)
	})
	return s, err
}

// absoluteRate is the rate for this patient in mg, units or mmol per hour.
func (w *work) absoluteRate(d quantity.DoseRate, by body.Kind) (*big.Rat, error) {
	if err := unitKind(d.Kind(), w.plan.Drug.Kind); err != nil {
		return nil, err
	}
	weight, surface, _, err := w.scalar(d.Basis(), by)
	if err != nil {
		return nil, err
	}
	switch d.Basis() {
	case quantity.PerKilogram:
		d, err = d.For(weight)
	case quantity.PerSquareMetre:
		d, err = d.On(surface)
	}
	if err != nil {
		return nil, err
	}
	return d.Rat(), nil
}

// setPump works the start rate.
func (w *work) setPump(part *InfusionPart) bool {
	s, c := w.plan.Style, w.plan.Mixture.Concentration
	start, err := pump.Set(w.o.Start.Value, part.per(), c, part.Step)
	if err != nil {
		if exact, e := pump.Flow(w.o.Start.Value, part.per(), c); e == nil {
			return w.refuse(refusal.Reason{
				Code: refusal.RateBelowPump, Field: "start",
				Got: s.FlowRate(exact), Want: "at least half of the pump's step, " + s.FlowRate(part.Step),
				Rule: "R8", Pos: w.o.Start.Pos,
				Message: fmt.Sprintf("the start dose needs %s, less than the pump can be set to",
					s.FlowRate(exact)),
				Remedy: "use a weaker mixture",
			})
		}
		return w.fault(err, "start", w.o.Start.Pos)
	}
	if pump.Beyond(start.Rate) {
		return w.refuse(refusal.Reason{
			Code: refusal.RateAbovePump, Field: "start",
			Got: s.FlowRate(start.Rate), Want: "a rate that a pump can be set to",
			Rule: "R8", Pos: w.o.Start.Pos,
			Source: "common practice, no source",
			Message: fmt.Sprintf("the start dose needs %s, more than pumps in common use can be set to",
				s.FlowRate(start.Rate)),
			Remedy: "check dose, unit and mixture; a stronger mixture runs slower",
		})
	}
	part.Start = start
	if !w.startWithin(part) {
		return false
	}
	start = part.Start
	if start.LostPercent.Cmp(new(big.Rat).Mul(w.site.tolerance.Rat(), big.NewRat(2, 1))) > 0 {
		return w.refuse(refusal.Reason{
			Code: refusal.RateRounding, Field: "start",
			Got: s.FlowRate(start.Exact), Want: "within " + s.Percent(w.site.tolerance) + " of a pump step, twice at most",
			Rule: "R2", Pos: w.o.Start.Pos,
			Message: fmt.Sprintf("the pump's nearest rate, %s, is %s more than the start dose asks for",
				s.FlowRate(start.Rate), percentOf(s, start.LostPercent)),
			Remedy: "use a weaker mixture, or a pump with a finer step",
		})
	}
	if new(big.Rat).Abs(start.LostPercent).Cmp(w.site.tolerance.Rat()) > 0 {
		w.caution(refusal.Reason{
			Code: refusal.RateRounding, Field: "start",
			Got: s.FlowRate(start.Exact), Want: s.FlowRate(start.Rate),
			Rule: "R2", Pos: w.o.Start.Pos,
			Message: fmt.Sprintf("rounding to the pump's step changes the start dose by %s; it gives %s",
				percentOf(s, start.LostPercent), s.DoseRate(start.Delivered)),
			Remedy: "a weaker mixture rounds less",
		})
	}
	if start.Rate.Rat().Cmp(one()) < 0 {
		w.caution(refusal.Reason{
			Code: refusal.RateSlow, Field: "start",
			Got: s.FlowRate(start.Rate), Want: "1 mL/h or more",
			Rule: "R8", Pos: w.o.Start.Pos,
			Source:  "Neff et al., Paediatr Anaesth 2001;11:561-565",
			Message: "below 1 mL/h a syringe pump may take many minutes to begin delivering",
			Remedy:  "purge the line on the pump before connecting, or use a weaker mixture",
		})
	}
	return true
}

// startWithin rounds the start rate down where the pump's nearest step would
// carry it past a limit that the order keeps (rule R11).
func (w *work) startWithin(part *InfusionPart) bool {
	c := w.plan.Mixture.Concentration
	row, err := w.rateScale(part.Rule, w.o.Start.Value, "start", w.o.Start.Pos)
	if err != nil {
		return w.sizeFault(err, "start", w.o.Start.Pos)
	}
	given := new(big.Rat).Mul(part.Start.Rate.Rat(), c.Rat())
	if passed(row.ceilings(), row.value, given) == nil {
		return true
	}
	part.Down = true
	if part.Start, err = pump.SetNotAbove(w.o.Start.Value, part.per(), c, part.Step); err != nil {
		return w.fault(err, "start", w.o.Start.Pos)
	}
	if part.Start.Rate.Rat().Sign() <= 0 {
		return w.refuse(refusal.Reason{
			Code: refusal.RateBelowPump, Field: "start",
			Got: w.plan.Style.FlowRate(part.Start.Exact), Want: "at least the pump's step",
			Rule: "R8", Pos: w.o.Start.Pos,
			Message: "below the limit there is no rate that the pump can be set to",
			Remedy:  "use a weaker mixture",
		})
	}
	return true
}

// setRange works the range to titrate in, the hard limit and the ladder.
func (w *work) setRange(part *InfusionPart) bool {
	c := w.plan.Mixture.Concentration
	low, high := w.rangeEnds(part)
	var err error
	if part.Low, err = pump.SetNotBelow(low, part.per(), c, part.Step); err != nil {
		return w.fault(err, "from", w.o.Start.Pos)
	}
	if part.High, err = pump.SetNotAbove(high, part.per(), c, part.Step); err != nil {
		return w.fault(err, "to", w.o.Start.Pos)
	}
	if h := part.Rule.HardHigh; h.Given() && h.Value.Basis() == w.o.Start.Value.Basis() {
		if part.Limit, err = pump.SetNotAbove(h.Value, part.per(), c, part.Step); err != nil {
			return w.fault(err, "limit", w.o.Start.Pos)
		}
	}
	if part.Ladder, err = pump.Ladder(low, high, rungs, part.per(), c, part.Step); err != nil {
		return w.fault(err, "ladder", w.o.Start.Pos)
	}
	part.Ladder = inside(part.Ladder, part)
	return true
}

// inside leaves out the rungs whose rounded rate passes an end of the range or
// the hard limit.
func inside(ladder []pump.Setting, part *InfusionPart) []pump.Setting {
	var out []pump.Setting
	for _, rung := range ladder {
		low := rung.Rate.Cmp(part.Low.Rate) < 0
		high := rung.Rate.Cmp(part.High.Rate) > 0
		limit := part.Limit.Rate.Given() && rung.Rate.Cmp(part.Limit.Rate) > 0
		if !low && !high && !limit {
			out = append(out, rung)
		}
	}
	return out
}

// rangeEnds are the ordered range, or the usual range of the row where it is
// counted like the order, or half to double the start.
func (w *work) rangeEnds(part *InfusionPart) (low, high quantity.DoseRate) {
	start, row := w.o.Start.Value, part.Rule
	low, high = start.Scaled(big.NewRat(1, 2)), start.Scaled(big.NewRat(2, 1))
	alike := func(f formulary.Figure[quantity.DoseRate]) bool {
		return f.Given() && f.Value.Basis() == start.Basis() &&
			f.Value.Unit().String() == start.Unit().String() && f.Value.Period() == start.Period()
	}
	if alike(row.UsualLow) && alike(row.UsualHigh) {
		low, high = row.UsualLow.Value, row.UsualHigh.Value
	} else if t := row.HardHigh; alike(t) {
		if n, err := high.Cmp(t.Value); err == nil && n > 0 {
			high = t.Value
		}
	}
	if w.o.From.Given() {
		low = w.o.From.Value
	}
	if w.o.To.Given() {
		high = w.o.To.Value
	}
	low, high = widen(low, high, start)
	if n, err := low.Cmp(high); err == nil && n == 0 {
		low = high.Scaled(big.NewRat(1, 2)) // one figure is no range: it opens downwards only
	}
	return low, high
}

// widen makes sure that the start lies inside the range.
func widen(low, high, start quantity.DoseRate) (quantity.DoseRate, quantity.DoseRate) {
	if n, err := start.Cmp(low); err == nil && n < 0 {
		low = start
	}
	if n, err := start.Cmp(high); err == nil && n > 0 {
		high = start
	}
	return low, high
}

// extras works the slips and the time until the syringe is empty.
func (w *work) extras(part *InfusionPart) bool {
	var err error
	if part.Slips, err = pump.Slips(w.o.Start.Value, part.per(), w.plan.Mixture.Concentration, part.Step); err != nil {
		return w.fault(err, "slips", w.o.Start.Pos)
	}
	if part.Minutes, err = w.plan.Mixture.FinalVolume.Minutes(part.Start.Rate); err != nil {
		return w.fault(err, "run time", w.o.Start.Pos)
	}
	w.oneWeight(part)
	return w.eachRung(part)
}

// eachRung puts into the ladder of a mixture for one weight what 1 mL/h gives,
// where that lies in the range: the one row that its rule promises.
func (w *work) eachRung(part *InfusionPart) bool {
	if !part.Each.Given() {
		return true
	}
	rung, err := pump.Set(part.Each, part.per(), w.plan.Mixture.Concentration, part.Step)
	if err != nil {
		return w.fault(err, "mixture", w.o.Mixture.Pos)
	}
	at := 0
	for i, other := range part.Ladder {
		n, err := other.Dose.Cmp(part.Each)
		if err != nil {
			return w.fault(err, "mixture", w.o.Mixture.Pos)
		}
		if n == 0 {
			return true
		}
		if n < 0 {
			at = i + 1
		}
	}
	if len(inside([]pump.Setting{rung}, part)) == 1 {
		part.Ladder = slices.Insert(part.Ladder, at, rung)
	}
	return true
}
