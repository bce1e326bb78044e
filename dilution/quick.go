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
	Mix           *QuickMix // how it is mixed; nil for a dose or a dose rate
	Run           *QuickRun // a dose rate: how long it runs; nil when that is open
}

// QuickLimits is what the row of limits says that a quick sum was held against.
type QuickLimits struct {
	By   body.Kind         // the weight that an order would go by; None or 0 for none
	Top  quantity.DoseRate // the highest dose rate stored, if one was checked
	Drug formulary.Drug    // the drug's record
	// Of a mixture: the presentations that it may be drawn from, which all allow
	// it alike; how many containers are opened where there is only one, 0 for a
	// powder; the diluent as listed, "" for none.
	Presentations []formulary.Presentation
	Containers    int
	Diluent       string
}

// Check holds q against f. It returns every refusal and caution; an empty list
// means that all limits that could be checked allow it.
func (q Quick) Check(f *formulary.Formulary) (refusal.List, QuickLimits) {
	var limits QuickLimits
	w := q.work(f)
	if !w.findDrug() {
		return w.told(), limits
	}
	limits.Drug = w.plan.Drug
	switch {
	case len(w.usable()) == 0:
		w.choosePresentation() // says that none is listed for this use
	case q.Mix != nil:
		limits.Presentations = w.mixed()
		limits.Containers, limits.Diluent = w.plan.Mixture.Containers, w.plan.Mixture.Diluent
	case q.Diluent != "":
		w.quickDiluent(q.Diluent)
	}
	if q.Concentration.Given() {
		w.plan.Mixture.Concentration = q.Concentration
		w.checkConcentration()
	}
	switch {
	case q.Dose.Given():
		if w.pickDose() {
			limits.By = w.plan.Dose.Rule.By
		}
	case q.Rate.Given():
		if rows, ok := fittingRows(w, w.plan.Drug.Rates, "dose rate"); ok {
			if row, ok := w.pickRate(rows); ok {
				w.plan.Infusion = &InfusionPart{Rule: row}
				limits.By, limits.Top = row.By, topOf(row)
				if q.Run != nil {
					w.run(row, q.Rate, *q.Run)
				}
			}
		}
	}
	w.unverified()
	return w.told(), limits
}

// work is the sum as work on a syringe that has no order file.
func (q Quick) work(f *formulary.Formulary) *work {
	w := &work{f: f, o: q.order(), fixed: &q}
	w.size = body.Size{Age: q.Age, Weight: q.Weight}
	w.plan = Plan{Order: w.o, Size: w.size, Style: q.Style, Route: "IV"}
	if q.Route != "" {
		w.plan.Route = q.Route
	}
	return w
}

// told is the reasons without the number of a syringe.
func (w *work) told() refusal.List {
	for i := range w.reasons {
		w.reasons[i].Syringe = 0
	}
	return w.reasons
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
	stock := ""
	if q.Mix != nil {
		stock = q.Mix.Presentation
	}
	return order.Syringe{
		Presentation: order.Field[string]{Value: stock, Text: stock},
		Infusion:     q.Infusion, Drug: order.Field[string]{Value: q.Drug, Text: q.Drug},
		Line:       order.Field[string]{Value: q.Line, Text: q.Line},
		Indication: order.Field[string]{Value: q.Indication, Text: q.Indication},
		Dose:       order.Field[quantity.Dose]{Value: q.Dose, Text: q.Style.Dose(q.Dose)},
		Start:      order.Field[quantity.DoseRate]{Value: q.Rate, Text: q.Style.DoseRate(q.Rate)},
	}
}

// quickDiluent checks the diluent of a dose or a dose rate, which do not name a
// presentation, against all presentations for the use: a fluid that any of them
// forbids is refused, and so is one that none of them lists.
func (w *work) quickDiluent(name string) {
	listed := false
	var unlisted refusal.List
	for _, p := range w.usable() {
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
