package dilution

import (
	"fmt"
	"math/big"

	"drawup/dilution/body"
	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// doseAmount is the dose of the order for this patient, as an amount.
func (w *work) doseAmount() (quantity.Amount, bool) {
	if !w.pickDose() {
		return quantity.Amount{}, false
	}
	return w.plan.Dose.Amount, true
}

// dose works the one dose of the order, if there is one: limits, volume on
// the giving barrel, and what that volume really gives.
func (w *work) dose() bool {
	if w.o.Infusion {
		return true
	}
	if !w.o.Dose.Given() {
		return w.noDose()
	}
	if !w.pickDose() {
		return false
	}
	d, m := w.plan.Dose, w.plan.Mixture
	exact, err := d.Amount.DrawnAt(m.Concentration)
	if err != nil {
		return w.fault(err, "dose", w.o.Dose.Pos)
	}
	d.Wanted, d.Step = exact, m.FinalBarrel.Step()
	if d.Volume, _, err = exact.ToStep(d.Step, quantity.HalfUp); err != nil {
		return w.fault(err, "dose", w.o.Dose.Pos)
	}
	if w.doseIsWhole() {
		// the syringe was read when the drug was drawn
		d.Volume, d.Step = m.DrugVolume, m.DrugReading.Barrel.Step()
	} else if !w.keepLimit(exact, d) || !w.doseReadable(exact, d) {
		return false
	}
	if d.Delivered, err = d.Volume.Holds(m.Concentration); err != nil {
		return w.fault(err, "dose", w.o.Dose.Pos)
	}
	return w.dosesFit(d)
}

// keepLimit moves a dose that its nearest graduation would carry past a limit
// to the graduation below (rule R11).
func (w *work) keepLimit(exact quantity.Volume, d *DosePart) bool {
	given, err := d.Volume.Holds(w.plan.Mixture.Concentration)
	if err != nil {
		return w.fault(err, "dose", w.o.Dose.Pos)
	}
	if passed(d.ceilings, d.Amount.Rat(), given.Rat()) == nil {
		return true
	}
	d.Down = true
	if d.Volume, _, err = exact.ToStep(d.Step, quantity.Down); err != nil {
		return w.fault(err, "dose", w.o.Dose.Pos)
	}
	return true
}

// doseIsWhole reports that the syringe holds exactly the one dose.
func (w *work) doseIsWhole() bool {
	return !w.o.Amount.Given() && !w.o.Concentration.Given() && !w.o.Doses.Given()
}

// doseReadable checks that the dose can be read off the giving barrel (R8).
func (w *work) doseReadable(exact quantity.Volume, d *DosePart) bool {
	s, m := w.plan.Style, w.plan.Mixture
	if exact.Cmp(m.FinalVolume) > 0 {
		return w.refuse(refusal.Reason{
			Code: refusal.ContradictoryAmounts, Field: "dose",
			Got: s.Volume(exact), Want: "at most " + s.Volume(m.FinalVolume),
			Rule: "R8", Pos: w.o.Dose.Pos,
			Message: fmt.Sprintf("one dose takes %s, more than the syringe holds", s.Volume(exact)),
			Remedy:  "order a larger volume or a stronger mixture",
		})
	}
	if exact.Cmp(w.site.smallest) < 0 {
		return w.refuse(refusal.Reason{
			Code: refusal.VolumeBelowMeasurable, Field: "dose",
			Got: s.Volume(exact), Want: "at least " + s.Volume(w.site.smallest),
			Rule: "R8", Pos: w.o.Dose.Pos,
			Message: fmt.Sprintf("one dose is %s, too little to measure", s.Volume(exact)),
			Remedy:  "order a weaker mixture",
		})
	}
	moved := new(big.Rat).Sub(d.Volume.Rat(), exact.Rat())
	moved.Quo(moved, exact.Rat()).Mul(moved, big.NewRat(100, 1))
	if new(big.Rat).Abs(moved).Cmp(w.site.tolerance.Rat()) > 0 {
		return w.refuse(refusal.Reason{
			Code: refusal.VolumeOffGraduation, Field: "dose",
			Got: s.Volume(exact), Want: "within " + s.Percent(w.site.tolerance) + " of a graduation",
			Rule: "R8", Pos: w.o.Dose.Pos,
			Message: fmt.Sprintf("the %s barrel cannot show one dose of %s within %s",
				s.Volume(m.FinalBarrel.Nominal()), s.Volume(exact), s.Percent(w.site.tolerance)),
			Remedy: "order a smaller syringe or a weaker mixture",
		})
	}
	if moved.Sign() != 0 {
		w.caution(refusal.Reason{
			Code: refusal.VolumeOffGraduation, Field: "dose",
			Got: s.Volume(exact), Want: s.Volume(d.Volume),
			Rule: "R2", Pos: w.o.Dose.Pos,
			Message: fmt.Sprintf("one dose is %s; "+graduationWord(d.Down)+" is %s: %s %s",
				s.Volume(exact), s.Volume(d.Volume), percentOf(s, moved), moreOrLess(moved.Sign())),
		})
	}
	return true
}

// routeOfDoses holds the route against the rows of single doses.
func (w *work) routeOfDoses() bool {
	var routes []string
	for _, r := range w.plan.Drug.Doses {
		routes = append(routes, r.Routes...)
	}
	return routeListed(routes, w.plan.Route) || w.routeUnlisted(routes)
}

// noDose checks the route alone and says that no dose was checked.
func (w *work) noDose() bool {
	if !w.routeOfDoses() {
		return false
	}
	return w.caution(refusal.Reason{
		Code: refusal.LimitsNotChecked, Rule: "R10",
		Field: "dose", Want: "a dose",
		Pos:     w.o.Pos,
		Message: "no dose was ordered for this syringe: its concentration was checked, its doses were not",
	})
}

// pickDose holds the dose against the rows of limits that fit route, age and
// indication, and fills plan.Dose once. Rows of one indication are
// alternatives: the mildest verdict holds. Indications are not: when they
// disagree and the order names none, the dose is refused, so that a slip for
// one purpose never passes as a dose for another.
func (w *work) pickDose() bool {
	if w.plan.Dose != nil {
		return w.doseOK
	}
	rows, ok := fittingRows(w, w.plan.Drug.Doses, "dose")
	if !ok {
		return false
	}
	var parts []*DosePart
	var found []judged
	for _, row := range countedAlike(rows, w.o.Dose.Value.Basis(), quantity.Dose.Basis) {
		d, v, err := w.judgeDose(row)
		if err != nil {
			return w.sizeFault(err, "dose", w.o.Dose.Pos)
		}
		parts, found = append(parts, d), append(found, judged{row.For, v})
	}
	i, ok := w.settle(found, "dose", w.o.Dose.Pos)
	if !ok {
		return false
	}
	best, verdict := parts[i], found[i].verdict
	w.plan.Dose, w.doseOK = best, verdict.rank < 3
	for _, r := range verdict.reasons {
		w.add(r)
	}
	w.unlikeWeight(w.o.DoseBy.Given(), w.o.DoseBy.Value, best.Rule.By, best.Rule.BySource, w.o.DoseBy.Pos)
	w.takenWeight(w.o.DoseBy.Given(), best.By, best.Weight, best.Rule.BySource, w.o.Dose.Pos)
	w.weightNotes(best.By)
	return w.doseOK
}

// judgeDose holds the ordered dose against one row, as absolute amounts.
func (w *work) judgeDose(row formulary.Rule[quantity.Dose]) (*DosePart, verdict, error) {
	by := row.By
	if w.o.DoseBy.Given() {
		by = w.o.DoseBy.Value
	}
	d := &DosePart{Ordered: w.o.Dose.Value, By: by, Rule: row}
	var err error
	if d.Weight, d.Surface, d.By, err = w.scalar(w.o.Dose.Value.Basis(), by); err != nil {
		return nil, verdict{}, err
	}
	if d.Amount, err = absolute(w.o.Dose.Value, d.Weight, d.Surface); err != nil {
		return nil, verdict{}, err
	}
	s := scale{
		what: "dose", field: "dose",
		value: d.Amount.Rat(), text: w.plan.Style.Dose(w.o.Dose.Value),
		codes: doseCodes, pos: w.o.Dose.Pos,
		acceptedBy: w.o.AcceptedBy.Value, acceptedReason: w.o.AcceptedReason.Value,
	}
	if d.Amount.Kind() != w.plan.Drug.Kind {
		return nil, verdict{}, &quantity.KindError{Got: d.Amount.Kind(), Want: w.plan.Drug.Kind}
	}
	err = fillScale(&s, row, w.plan.Style.Dose, func(x quantity.Dose) (*big.Rat, error) {
		weight, surface, _, err := w.scalar(x.Basis(), row.By)
		if err != nil {
			return nil, err
		}
		a, err := absolute(x, weight, surface)
		if err != nil {
			return nil, err
		}
		return a.Rat(), unitKind(a.Kind(), w.plan.Drug.Kind)
	})
	if err != nil {
		return nil, verdict{}, err
	}
	if d.Weight.Given() && d.By != row.By && row.By != body.None && row.By != 0 {
		// 0.6 mg/kg can be more than 0.6 mg/kg: say of which weight.
		s.text += " of " + scalarWord(d.By)
		s.row += ", by " + scalarWord(row.By)
	}
	v := s.judge()
	w.totalMax(row, d, &v)
	if err := w.courseMaxima(row, d, &v); err != nil {
		return nil, verdict{}, err
	}
	d.ceilings = s.ceilings()
	if f := row.TotalMax; f.Given() {
		d.ceilings = append(d.ceilings, bound{
			true, f.Value.Rat(), w.plan.Style.Amount(f.Value), sourceWords(f.Source, f.Unverified),
		})
	}
	return d, v, nil
}

// totalMax applies the absolute maximum of a row (R11).
func (w *work) totalMax(row formulary.Rule[quantity.Dose], d *DosePart, v *verdict) {
	f := row.TotalMax
	if !f.Given() {
		return
	}
	if n, err := d.Amount.Cmp(f.Value); err == nil && n > 0 {
		v.say(3, refusal.Reason{
			Code: refusal.DoseAboveTotal, Field: "dose",
			Got: w.plan.Style.Amount(d.Amount), Want: "at most " + w.plan.Style.Amount(f.Value),
			Rule: "R11", Source: sourceWords(f.Source, f.Unverified),
			Pos: w.o.Dose.Pos,
			Message: fmt.Sprintf("%s is more than the absolute maximum of %s",
				w.plan.Style.Amount(d.Amount), w.plan.Drug.Name),
			Remedy: "check dose and weight; no setting passes this limit",
		})
	}
}
