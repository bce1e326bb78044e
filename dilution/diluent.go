package dilution

import (
	"fmt"
	"strings"

	"drawup/dilution/formulary"
	"drawup/dilution/refusal"
)

// settleDiluent checks the diluent, or its absence, against the record (R10).
func (w *work) settleDiluent() bool {
	p, m := w.plan.Presentation, &w.plan.Mixture
	if m.Method == Neat {
		if !p.Neat {
			return w.refuse(refusal.Reason{
				Code: refusal.MustBeDiluted, Field: "diluent",
				Got: "undiluted", Want: joinOr(diluentNames(p.Diluents)),
				Rule: "R10", Source: p.Source.Title,
				Pos:     w.o.Pos,
				Message: fmt.Sprintf("%q of %s must be diluted before use", p.ID, w.plan.Drug.Name),
				Remedy:  "order a concentration and a volume",
			})
		}
		if w.o.Diluent.Given() {
			return w.forbiddenOr(w.o.Diluent.Value, func() bool {
				return w.caution(refusal.Reason{
					Code: refusal.DiluentMissing, Field: "diluent",
					Got: w.o.Diluent.Text, Want: "none",
					Rule: "R5", Pos: w.o.Diluent.Pos,
					Message: "the syringe is undiluted; the diluent of the order is not used",
				})
			})
		}
		return true
	}
	name, ok := w.diluentName()
	if !ok {
		return false
	}
	return w.forbiddenOr(name, func() bool { return w.listedDiluent(name) })
}

// diluentName is what the order, its standard, or the only listed diluent says.
func (w *work) diluentName() (string, bool) {
	p := w.plan.Presentation
	if w.o.Diluent.Given() {
		return strings.TrimSpace(w.o.Diluent.Value), true
	}
	if s, ok := w.plan.Drug.Standard(w.plan.Standard); ok && s.Diluent != "" {
		return s.Diluent, true
	}
	if name, ok := w.onlyStockedFluid(); ok {
		return name, true
	}
	switch len(p.Diluents) {
	case 0:
		return "", w.refuse(refusal.Reason{
			Code: refusal.FormularyBlank, Field: "diluent",
			Want: "a listed diluent", Rule: "R10",
			Source: p.Source.Title, Pos: w.o.Pos,
			Message: fmt.Sprintf("the formulary lists no diluent for %q of %s: it may be used undiluted only",
				p.ID, w.plan.Drug.Name),
			Remedy: "order it undiluted, or add a diluent with its source to the formulary " +
				"(whoever keeps it does that)",
		})
	case 1:
		return p.Diluents[0].Name, true
	}
	return "", w.refuse(refusal.Reason{
		Code: refusal.DiluentMissing, Field: "diluent",
		Want: joinOr(diluentNames(p.Diluents)), Rule: "R10",
		Pos:     w.o.Pos,
		Message: "the order does not say what to dilute with",
		Remedy:  "write diluent = one of: " + joinOr(diluentNames(p.Diluents)),
	})
}

func diluentNames(list []formulary.Diluent) []string {
	var out []string
	for _, d := range list {
		out = append(out, fmt.Sprintf("%q", d.Name))
	}
	return out
}

func (w *work) forbiddenOr(name string, next func() bool) bool {
	for _, d := range w.plan.Presentation.Forbidden {
		if strings.EqualFold(d.Name, name) {
			return w.refuse(refusal.Reason{
				Code: refusal.DiluentForbidden, Field: "diluent",
				Got: name, Want: joinOr(diluentNames(w.plan.Presentation.Diluents)),
				Rule: "R10", Source: d.Source.Title,
				Pos:     w.o.Diluent.Pos,
				Message: fmt.Sprintf("%s must not be mixed with %s: %s", w.plan.Drug.Name, d.Name, d.Reason),
				Remedy:  w.diluentRemedy(),
			})
		}
	}
	return next()
}

func (w *work) listedDiluent(name string) bool {
	p := w.plan.Presentation
	for _, d := range p.Diluents {
		if strings.EqualFold(d.Name, name) {
			w.plan.Mixture.Diluent = d.Name
			for _, fluid := range p.AddFluids {
				if fluid == d.Name {
					w.plan.Mixture.AddFluid = fluid
				}
			}
			return true
		}
	}
	return w.refuse(refusal.Reason{
		Code: refusal.DiluentNotListed, Field: "diluent",
		Got: name, Want: joinOr(diluentNames(p.Diluents)),
		Rule: "R10", Source: p.Source.Title,
		Pos: w.o.Diluent.Pos,
		Message: fmt.Sprintf("the formulary does not list %s as a diluent for %q of %s",
			name, p.ID, w.plan.Drug.Name),
		Remedy: w.diluentRemedy(),
	})
}

func (w *work) diluentRemedy() string {
	if len(w.plan.Presentation.Diluents) == 0 {
		return "use it undiluted"
	}
	return "use " + joinOr(diluentNames(w.plan.Presentation.Diluents))
}
