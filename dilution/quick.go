package dilution

import (
	"drawup/dilution/body"
	"drawup/dilution/formulary"
	"drawup/dilution/order"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// A Quick is a bare sum to be held against the formulary, as strictly as an
// order is: the drug, how it is used, and the figures that are known. Fields
// that are not given are not checked.
//
// Weight and Surface are those that the dose was worked with. They are taken
// as the ones that the limits go by; the caller says so to the user.
type Quick struct {
	Drug          string
	Infusion      bool
	Route         string // "IV" when empty
	Line          string // "peripheral" when empty
	Indication    string
	Diluent       string
	Age           body.Age
	Weight        quantity.BodyWeight
	Surface       quantity.BodySurfaceArea
	Strength      quantity.Concentration
	Concentration quantity.Concentration
	Dose          quantity.Dose
	Rate          quantity.DoseRate
	Style         quantity.Style
}

// QuickLimits is what the row of limits says that a quick sum was held against.
type QuickLimits struct {
	By  body.Kind         // the weight that an order would go by; None or 0 for none
	Top quantity.DoseRate // the highest dose rate stored, if one was checked
}

// Check holds q against f. It returns every refusal and caution; an empty list
// means that all limits that could be checked allow it.
func (q Quick) Check(f *formulary.Formulary) (refusal.List, QuickLimits) {
	var limits QuickLimits
	w := &work{f: f, o: q.order(), fixed: &q}
	w.size = body.Size{Age: q.Age, Weight: q.Weight}
	w.plan = Plan{Order: w.o, Size: w.size, Style: q.Style, Route: "IV"}
	if q.Route != "" {
		w.plan.Route = q.Route
	}
	if !w.findDrug() {
		return w.reasons, limits
	}
	if q.Concentration.Given() {
		w.plan.Mixture.Concentration = q.Concentration
		w.checkConcentration()
	}
	if q.Diluent != "" {
		w.quickDiluent(q.Diluent)
	}
	switch {
	case q.Dose.Given():
		if w.pickDose() {
			limits.By = w.plan.Dose.Rule.By
		}
	case q.Rate.Given():
		if rows, ok := fittingRows(w, w.plan.Drug.Rates, "dose rate"); ok {
			if row, ok := w.pickRate(rows); ok {
				limits = QuickLimits{row.By, topOf(row)}
			}
		}
	}
	for i := range w.reasons {
		w.reasons[i].Syringe = 0
	}
	return w.reasons, limits
}

// topOf is the highest dose rate that a row stores.
func topOf(row formulary.Rule[quantity.DoseRate]) quantity.DoseRate {
	for _, f := range []formulary.Figure[quantity.DoseRate]{row.HardHigh, row.SoftHigh, row.UsualHigh} {
		if f.Given() {
			return f.Value
		}
	}
	return quantity.DoseRate{}
}

// order is q in the words of an order.
func (q Quick) order() order.Syringe {
	return order.Syringe{
		Infusion: q.Infusion, Drug: order.Field[string]{Value: q.Drug, Text: q.Drug},
		Line:       order.Field[string]{Value: q.Line, Text: q.Line},
		Indication: order.Field[string]{Value: q.Indication, Text: q.Indication},
		Dose:       order.Field[quantity.Dose]{Value: q.Dose, Text: q.Style.Dose(q.Dose)},
		Start:      order.Field[quantity.DoseRate]{Value: q.Rate, Text: q.Style.DoseRate(q.Rate)},
	}
}

// quickDiluent checks the diluent against the presentations of the drug that
// have the strength at hand, or against all when no strength is given: a fluid
// that any of them forbids is refused, and so is one that none of them lists.
func (w *work) quickDiluent(name string) {
	listed := false
	var unlisted refusal.List
	for _, p := range w.usable() {
		if c, err := p.Amount.In(p.Volume); w.fixed.Strength.Given() && (err != nil || !c.Equal(w.fixed.Strength)) {
			continue
		}
		trial := &work{f: w.f, o: w.o, plan: w.plan, fixed: w.fixed}
		trial.plan.Presentation = p
		forbidden := !trial.forbiddenOr(name, func() bool { return true })
		if forbidden {
			w.reasons = append(w.reasons, trial.reasons...)
			return
		}
		if trial.listedDiluent(name) {
			listed = true
		} else {
			unlisted = trial.reasons
		}
	}
	if !listed {
		w.reasons = append(w.reasons, unlisted...)
	}
}
