package dilution

import (
	"errors"
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
		d.Volume, d.Step = m.DrugVolume, m.DrugReading.Barrel.Step()
	} else if !w.keepLimit(exact, d) || !w.doseReadable(exact, d) {
		return false
	}
	if d.Delivered, err = d.Volume.Holds(m.Concentration); err != nil {
		return w.fault(err, "dose", w.o.Dose.Pos)
	}
	return true
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
	return !w.o.Amount.Given() && !w.o.Concentration.Given()
}

// doseReadable checks that the dose can be read off the giving barrel (R8).
func (w *work) doseReadable(exact quantity.Volume, d *DosePart) bool {
	s, m := w.plan.Style, w.plan.Mixture
	if exact.Cmp(m.FinalVolume) > 0 {
		return w.refuse(refusal.Reason{Code: refusal.ContradictoryAmounts, Field: "dose", Got: s.Volume(exact), Want: "at most " + s.Volume(m.FinalVolume), Rule: "R8", Pos: w.o.Dose.Pos,
			Message: fmt.Sprintf("one dose takes %s, more than the syringe holds", s.Volume(exact)), Remedy: "order a larger volume or a stronger mixture"})
	}
	if exact.Cmp(w.site.smallest) < 0 {
		return w.refuse(refusal.Reason{Code: refusal.VolumeBelowMeasurable, Field: "dose", Got: s.Volume(exact), Want: "at least " + s.Volume(w.site.smallest), Rule: "R8", Pos: w.o.Dose.Pos,
			Message: fmt.Sprintf("one dose is %s, too little to measure", s.Volume(exact)), Remedy: "order a weaker mixture"})
	}
	moved := new(big.Rat).Sub(d.Volume.Rat(), exact.Rat())
	moved.Quo(moved, exact.Rat()).Mul(moved, big.NewRat(100, 1))
	if new(big.Rat).Abs(moved).Cmp(w.site.tolerance.Rat()) > 0 {
		return w.refuse(refusal.Reason{Code: refusal.VolumeOffGraduation, Field: "dose", Got: s.Volume(exact), Want: "within " + s.Percent(w.site.tolerance) + " of a graduation", Rule: "R8", Pos: w.o.Dose.Pos,
			Message: fmt.Sprintf("the %s barrel cannot show one dose of %s within %s", s.Volume(m.FinalBarrel.Nominal()), s.Volume(exact), s.Percent(w.site.tolerance)), Remedy: "order a smaller syringe or a weaker mixture"})
	}
	if moved.Sign() != 0 {
		w.caution(refusal.Reason{Code: refusal.VolumeOffGraduation, Field: "dose", Got: s.Volume(exact), Want: s.Volume(d.Volume), Rule: "R2", Pos: w.o.Dose.Pos,
			Message: fmt.Sprintf("one dose is %s; "+graduationWord(d.Down)+" is %s: %s %s", s.Volume(exact), s.Volume(d.Volume), percentOf(s, moved), moreOrLess(moved.Sign()))})
	}
	return true
}

// noDose checks the route alone and says that no dose was checked.
func (w *work) noDose() bool {
	var routes []string
	for _, r := range w.plan.Drug.Doses {
		routes = append(routes, r.Routes...)
	}
	if !routeListed(routes, w.plan.Route) {
		return w.routeUnlisted(routes)
	}
	return w.caution(refusal.Reason{Code: refusal.LimitsNotChecked, Rule: "R10", Field: "dose", Want: "a dose", Pos: w.o.Pos,
		Message: "no dose was ordered for this syringe: its concentration was checked, its doses were not"})
}

func (w *work) routeUnlisted(routes []string) bool {
	return w.refuse(refusal.Reason{Code: refusal.RouteNotListed, Field: "route", Got: w.plan.Route, Want: joinOr(unique(routes)), Rule: "R10", Pos: w.o.Pos,
		Message: fmt.Sprintf("the formulary lists no dose of %s by the route %q", w.plan.Drug.Name, w.plan.Route), Remedy: "check the route; add it with its source to the formulary (whoever keeps it does that) if it is right"})
}

func unique(list []string) []string {
	var out []string
	for _, s := range list {
		if !routeListed(out, s) {
			out = append(out, s)
		}
	}
	return out
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

// countedAlike keeps, of each indication, the rows that are counted as the
// order is: per kg, per square metre or absolute. Where there is none, all of
// that indication stay. Otherwise a tenth of a dose per kg would pass as a small
// absolute dose.
func countedAlike[T any](rows []formulary.Rule[T], basis quantity.Basis, of func(T) quantity.Basis) []formulary.Rule[T] {
	alike := func(r formulary.Rule[T]) bool {
		for _, f := range []formulary.Figure[T]{r.UsualHigh, r.SoftHigh, r.HardHigh} {
			if f.Given() {
				return of(f.Value) == basis
			}
		}
		return false
	}
	some := map[string]bool{}
	for _, r := range rows {
		some[r.For] = some[r.For] || alike(r)
	}
	var out []formulary.Rule[T]
	for _, r := range rows {
		if alike(r) || !some[r.For] {
			out = append(out, r)
		}
	}
	return out
}

// A judged is a verdict and the indication whose row gave it.
type judged struct {
	purpose string
	verdict verdict
}

// settle picks the row that counts: the mildest of the one indication, or of
// all when they agree.
func (w *work) settle(found []judged, field string, pos refusal.Pos) (int, bool) {
	best := map[string]int{}
	var purposes []string
	for i, j := range found {
		at, seen := best[j.purpose]
		if !seen {
			purposes = append(purposes, j.purpose)
		}
		if !seen || j.verdict.rank < found[at].verdict.rank {
			best[j.purpose] = i
		}
	}
	first := best[purposes[0]]
	for _, p := range purposes[1:] {
		if found[best[p]].verdict.rank != found[first].verdict.rank {
			return 0, w.refuse(refusal.Reason{Code: refusal.IndicationUnclear, Field: field, Want: joinOr(quoted(purposes)), Rule: "R10", Pos: pos,
				Message: fmt.Sprintf("the limits of %s depend on what it is for, and the order does not say: this %s is right for one use and wrong for another", w.plan.Drug.Name, field),
				Remedy:  "write indication = one of: " + joinOr(quoted(purposes))})
		}
	}
	return first, true
}

func quoted(list []string) []string {
	out := make([]string, len(list))
	for i, s := range list {
		out[i] = fmt.Sprintf("%q", s)
	}
	return out
}

// fittingRows are the rows for this route, age and indication.
func fittingRows[T any](w *work, rules []formulary.Rule[T], field string) ([]formulary.Rule[T], bool) {
	if len(rules) == 0 {
		return nil, w.refuse(refusal.Reason{Code: refusal.FormularyBlank, Field: field, Want: "limits for " + w.use(), Rule: "R10", Pos: w.o.Pos,
			Message: fmt.Sprintf("the formulary has no %s limits of %s for %s", field, w.plan.Drug.Name, w.use()), Remedy: "add them with their source to the formulary (whoever keeps it does that)"})
	}
	var rows []formulary.Rule[T]
	var routes, bands, fors []string
	routeOK, ageMissing := false, false
	for _, r := range rules {
		routes = append(routes, r.Routes...)
		if !routeListed(r.Routes, w.plan.Route) {
			continue
		}
		routeOK = true
		fors = append(fors, r.For)
		if w.o.Indication.Given() && r.For != w.o.Indication.Value {
			continue
		}
		bands = append(bands, r.Ages())
		if r.Fits(w.size.Age) {
			rows = append(rows, r)
		} else if !w.size.Age.Given() {
			ageMissing = true
		}
	}
	switch {
	case len(rows) > 0:
		return rows, true
	case !routeOK:
		return nil, w.routeUnlisted(routes)
	case len(bands) == 0:
		return nil, w.refuse(refusal.Reason{Code: refusal.ValueUnknown, Field: "indication", Got: w.o.Indication.Text, Want: joinOr(unique(fors)), Rule: "R10", Pos: w.o.Indication.Pos,
			Message: fmt.Sprintf("the formulary has no %s of %s for %q", field, w.plan.Drug.Name, w.o.Indication.Value), Remedy: "write indication = one of: " + joinOr(unique(fors))})
	case ageMissing:
		return nil, w.refuse(refusal.Reason{Code: refusal.AgeMissing, Field: "patient.age", Want: `an age such as "82 years"`, Rule: "R10", Pos: w.patient.Pos,
			Message: fmt.Sprintf("the %s limits of %s depend on age, and the patient has none", field, w.plan.Drug.Name), Remedy: "write the patient's age"})
	}
	return nil, w.refuse(refusal.Reason{Code: refusal.AgeOutside, Field: "patient.age", Got: w.size.Age.String(), Want: joinOr(unique(bands)), Rule: "R10", Pos: w.patient.Age.Pos,
		Message: fmt.Sprintf("the formulary has no %s of %s for a patient of %s", field, w.plan.Drug.Name, w.size.Age), Remedy: "check the age; add the age band with its source to the formulary (whoever keeps it does that) if it is right"})
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
	s := scale{what: "dose", field: "dose", value: d.Amount.Rat(), text: w.plan.Style.Dose(w.o.Dose.Value), codes: doseCodes, pos: w.o.Dose.Pos,
		acceptedBy: w.o.AcceptedBy.Value, acceptedReason: w.o.AcceptedReason.Value}
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
	v := s.judge()
	w.totalMax(row, d, &v)
	d.ceilings = s.ceilings()
	if f := row.TotalMax; f.Given() {
		d.ceilings = append(d.ceilings, bound{true, f.Value.Rat(), w.plan.Style.Amount(f.Value), sourceWords(f.Source, f.Unverified)})
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
		v.say(3, refusal.Reason{Code: refusal.DoseAboveTotal, Field: "dose", Got: w.plan.Style.Amount(d.Amount), Want: "at most " + w.plan.Style.Amount(f.Value), Rule: "R11", Source: sourceWords(f.Source, f.Unverified), Pos: w.o.Dose.Pos,
			Message: fmt.Sprintf("%s is more than the absolute maximum of %s", w.plan.Style.Amount(d.Amount), w.plan.Drug.Name), Remedy: "check dose and weight; no setting passes this limit"})
	}
}

// scalar is what a dose of this basis is multiplied by. A dose per kg in a row
// that goes by no weight goes by the actual one.
func (w *work) scalar(basis quantity.Basis, by body.Kind) (quantity.BodyWeight, quantity.BodySurfaceArea, body.Kind, error) {
	switch basis {
	case quantity.PerKilogram:
		if by == body.None || by == body.Surface || by == 0 {
			by = body.Actual
		}
		if w.fixed != nil && w.fixed.Weight.Given() {
			return w.fixed.Weight, quantity.BodySurfaceArea{}, by, nil
		}
		if w.fixed != nil {
			return quantity.BodyWeight{}, quantity.BodySurfaceArea{}, by, &body.MissingError{Equation: "a limit per kg by " + by.String() + " weight", What: body.NeedWeight}
		}
		weight, err := w.size.Used(by)
		return weight, quantity.BodySurfaceArea{}, by, err
	case quantity.PerSquareMetre:
		if w.fixed != nil && w.fixed.Surface.Given() {
			return quantity.BodyWeight{}, w.fixed.Surface, body.Surface, nil
		}
		s, err := w.size.UsedSurface()
		return quantity.BodyWeight{}, s, body.Surface, err
	}
	return quantity.BodyWeight{}, quantity.BodySurfaceArea{}, body.None, nil
}

func absolute(d quantity.Dose, weight quantity.BodyWeight, surface quantity.BodySurfaceArea) (quantity.Amount, error) {
	switch d.Basis() {
	case quantity.PerKilogram:
		return d.For(weight)
	case quantity.PerSquareMetre:
		return d.On(surface)
	}
	return d.Amount()
}

// unlikeWeight cautions when the order goes by another weight than the
// formulary does.
func (w *work) unlikeWeight(given bool, ordered, row body.Kind, source formulary.Source, pos refusal.Pos) {
	if !given || ordered == row || row == body.None || row == 0 {
		return
	}
	w.caution(refusal.Reason{Code: refusal.WeightBasisUnlike, Field: "dose", Got: scalarWord(ordered), Want: scalarWord(row), Rule: "R3", Source: source.Title, Pos: pos,
		Message: fmt.Sprintf("the order goes by %s, the formulary by %s; the limits were checked as absolute amounts", scalarWord(ordered), scalarWord(row))})
}

// takenWeight cautions when a dose per kg names no weight and the formulary's
// choice is another than the actual one: the preparer has to see it.
func (w *work) takenWeight(named bool, by body.Kind, weight quantity.BodyWeight, source formulary.Source, pos refusal.Pos) {
	if named || w.fixed != nil || !weight.Given() || by == body.Actual {
		return
	}
	w.caution(refusal.Reason{Code: refusal.WeightFromFormulary, Field: "dose", Got: "no weight named", Want: scalarWord(by), Rule: "R3", Source: source.Title, Pos: pos,
		Message: fmt.Sprintf("the order does not say which weight the dose goes by; the formulary's %s, %s, is taken, not the actual one", scalarWord(by), w.plan.Style.BodyWeight(weight)),
		Remedy:  "write the word after the dose, such as \"mg/kg " + by.String() + "\""})
}

// scalarWord is what a dose goes by, in words.
func scalarWord(k body.Kind) string {
	if k == body.Surface {
		return "body surface"
	}
	return k.String() + " weight"
}

// weightNotes adds what there is to say about the weight that was used.
func (w *work) weightNotes(by body.Kind) {
	if by == body.None || by == 0 || w.noted[by] || w.fixed != nil {
		return
	}
	if w.noted == nil {
		w.noted = map[body.Kind]bool{}
	}
	w.noted[by] = true
	if w.patient.Estimated {
		w.caution(refusal.Reason{Code: refusal.WeightEstimated, Field: "patient.weight", Got: w.patient.Weight.Text, Want: "a measured weight", Rule: "R3", Pos: w.patient.Weight.Pos,
			Message: "the body weight is estimated, not measured"})
	}
	for _, n := range w.size.NotesFor(by) {
		w.caution(refusal.Reason{Code: refusal.Code(n.Code), Field: "patient", Rule: "R3", Source: n.Source, Message: n.Text, Pos: w.patient.Pos})
	}
}

// sizeFault turns an error of the body equations or of kinds into a reason.
func (w *work) sizeFault(err error, field string, pos refusal.Pos) bool {
	if r, ok := missingBody(err); ok {
		r.Pos = w.patient.Pos
		return w.refuse(r)
	}
	return w.fault(err, field, pos)
}

// missingBody says which value of the patient an equation lacks, or why the
// equation does not hold.
func missingBody(err error) (refusal.Reason, bool) {
	var missing *body.MissingError
	var outside *body.OutsideEquation
	switch {
	case errors.As(err, &missing):
		code := map[body.Value]refusal.Code{body.NeedWeight: refusal.WeightMissing, body.NeedHeight: refusal.HeightMissing, body.NeedSex: refusal.SexMissing, body.NeedAge: refusal.AgeMissing}[missing.What]
		return refusal.Reason{Code: code, Field: "patient", Rule: "R3", Want: "the patient's " + fmt.Sprint(missing.What),
			Message: fmt.Sprintf("%s needs the patient's %v, which the order does not give", missing.Equation, missing.What), Remedy: "measure it and write it into the order"}, true
	case errors.As(err, &outside):
		return refusal.Reason{Code: refusal.BodySizeOutside, Field: "patient", Rule: "R3", Source: outside.Source,
			Message: outside.Equation + " does not hold here: " + outside.Reason, Remedy: "order by actual weight if the formulary allows it, or as an amount"}, true
	}
	return refusal.Reason{}, false
}
