package dilution

import (
	"errors"
	"fmt"

	"drawup/dilution/body"
	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// scalar is what a dose of this basis is multiplied by. A dose per kg in a row
// that goes by no weight goes by the actual one.
func (w *work) scalar(
	basis quantity.Basis,
	by body.Kind,
) (quantity.BodyWeight, quantity.BodySurfaceArea, body.Kind, error) {
	switch basis {
	case quantity.PerKilogram:
		if by == body.None || by == body.Surface || by == 0 {
			by = body.Actual
		}
		if w.fixed != nil && w.fixed.Weight.Given() {
			return w.fixed.Weight, quantity.BodySurfaceArea{}, by, nil
		}
		if w.fixed != nil {
			return quantity.BodyWeight{}, quantity.BodySurfaceArea{}, by, &body.MissingError{
				Equation: "a limit per kg by " + by.String() + " weight", What: body.NeedWeight,
			}
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
	w.caution(refusal.Reason{
		Code: refusal.WeightBasisUnlike, Field: "dose",
		Got: scalarWord(ordered), Want: scalarWord(row),
		Rule: "R3", Source: source.Title,
		Pos: pos,
		Message: fmt.Sprintf(
			"the order goes by %s, the formulary by %s; the limits were checked as absolute amounts",
			scalarWord(ordered), scalarWord(row),
		),
	})
}

// takenWeight cautions when a dose per kg names no weight and the formulary's
// choice is another than the actual one: the preparer has to see it.
func (w *work) takenWeight(
	named bool,
	by body.Kind,
	weight quantity.BodyWeight,
	source formulary.Source,
	pos refusal.Pos,
) {
	if named || w.fixed != nil || !weight.Given() || by == body.Actual {
		return
	}
	w.caution(refusal.Reason{
		Code: refusal.WeightFromFormulary, Field: "dose",
		Got: "no weight named", Want: scalarWord(by),
		Rule: "R3", Source: source.Title,
		Pos: pos,
		Message: fmt.Sprintf(
			"the order does not say which weight the dose goes by; the formulary's %s, %s, is taken, not the "+
				"actual one",
			scalarWord(by), w.plan.Style.BodyWeight(weight),
		),
		Remedy: "write the word after the dose, such as \"mg/kg " + by.String() + "\"",
	})
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
		w.caution(refusal.Reason{
			Code: refusal.WeightEstimated, Field: "patient.weight",
			Got: w.patient.Weight.Text, Want: "a measured weight",
			Rule: "R3", Pos: w.patient.Weight.Pos,
			Message: "the body weight is estimated, not measured",
		})
	}
	for _, n := range w.size.NotesFor(by) {
		w.caution(refusal.Reason{
			Code: refusal.Code(n.Code), Field: "patient",
			Rule: "R3", Source: n.Source,
			Pos:     w.patient.Pos,
			Message: n.Text,
		})
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
		code := map[body.Value]refusal.Code{
			body.NeedWeight: refusal.WeightMissing, body.NeedHeight: refusal.HeightMissing,
			body.NeedSex: refusal.SexMissing, body.NeedAge: refusal.AgeMissing,
		}[missing.What]
		return refusal.Reason{
			Code: code, Field: "patient",
			Rule: "R3", Want: "the patient's " + fmt.Sprint(missing.What),
			Message: fmt.Sprintf("%s needs the patient's %v, which the order does not give",
				missing.Equation, missing.What),
			Remedy: "measure it and write it into the order",
		}, true
	case errors.As(err, &outside):
		return refusal.Reason{
			Code: refusal.BodySizeOutside, Field: "patient",
			Rule: "R3", Source: outside.Source,
			Message: outside.Equation + " does not hold here: " + outside.Reason,
			Remedy:  "order by actual weight if the formulary allows it, or as an amount",
		}, true
	}
	return refusal.Reason{}, false
}
