package dilution

import (
	"fmt"
	"strings"

	"drawup/dilution/formulary"
	"drawup/dilution/refusal"
)

// permitted holds the chosen presentation against what its own record says of
// routes, pumps, preservatives, ages and powders.
func (w *work) permitted() bool {
	return w.byThisRoute() && w.inPump() && w.unpreserved() && w.forThisAge() && w.powderKnown()
}

// routeFits reports whether the presentation may be given by the ordered route.
func (w *work) routeFits(p formulary.Presentation) bool {
	return len(p.Routes) == 0 || routeListed(p.Routes, w.plan.Route)
}

// byThisRoute refuses a route that the presentation is not bound to (R10).
func (w *work) byThisRoute() bool {
	p := w.plan.Presentation
	if w.routeFits(p) {
		return true
	}
	return w.refuse(refusal.Reason{
		Code: refusal.RouteNotListed, Field: "route",
		Got: w.plan.Route, Want: joinOr(p.Routes),
		Rule: "R10", Source: p.Source.Title, Pos: w.o.Pos,
		Message: fmt.Sprintf("%q of %s is not for the route %q", p.ID, w.plan.Drug.Name, w.plan.Route),
		Remedy:  "take another presentation, or check the route",
	})
}

// inPump refuses an infusion from a presentation that may not go into a pump.
func (w *work) inPump() bool {
	p := w.plan.Presentation
	if !w.o.Infusion || p.NotForPump == nil {
		return true
	}
	return w.refuse(refusal.Reason{
		Code: refusal.PresentationNotPump, Field: "presentation",
		Got: p.ID, Want: "a presentation that may go into a pump",
		Rule: "R10", Source: p.NotForPump.Source.Title, Pos: w.o.Pos,
		Message: fmt.Sprintf("%q of %s may not go into a pump: %s", p.ID, w.plan.Drug.Name, p.NotForPump.Text),
		Remedy:  "take another presentation",
	})
}

// neuraxial reports a route beside the spinal cord.
func neuraxial(route string) bool {
	switch strings.ToLower(route) {
	case "epidural", "intrathecal", "spinal", "caudal":
		return true
	}
	return false
}

// unpreserved refuses a preserved presentation beside the spinal cord.
func (w *work) unpreserved() bool {
	p := w.plan.Presentation
	if p.Preserved == nil || !neuraxial(w.plan.Route) {
		return true
	}
	return w.refuse(refusal.Reason{
		Code: refusal.PreservedNeuraxial, Field: "presentation",
		Got: p.ID, Want: "a presentation without preservative",
		Rule: "R11", Source: p.Preserved.Source.Title, Pos: w.o.Pos,
		Message: fmt.Sprintf("%q of %s is preserved (%s) and must never be given by the route %q",
			p.ID, w.plan.Drug.Name, p.Preserved.Text, w.plan.Route),
		Remedy: "take a presentation without preservative; no setting passes this limit",
	})
}

// diluentStrength holds the mixture against the range of concentrations in
// which its diluent may be used: thiopental in too much water, for instance,
// is too thin for blood (R10).
func (w *work) diluentStrength() bool {
	m, s := w.plan.Mixture, w.plan.Style
	for _, d := range w.plan.Presentation.Diluents {
		if d.Name != m.Diluent || m.Method == Neat {
			continue
		}
		if n, err := m.Concentration.Cmp(d.High.Value); d.High.Given() && (err != nil || n > 0) {
			return w.refuse(refusal.Reason{
				Code: refusal.ConcentrationTooHigh, Field: "diluent",
				Got: s.Concentration(m.Concentration), Want: "at most " + s.Concentration(d.High.Value) + " in " + d.Name,
				Rule: "R10", Source: d.High.Source.Title, Pos: w.o.Pos,
				Message: fmt.Sprintf("%s is stronger than %s may be in %s", s.Concentration(m.Concentration), w.plan.Drug.Name, d.Name),
				Remedy:  "order a larger volume, or another diluent",
			})
		}
		if n, err := m.Concentration.Cmp(d.Low.Value); d.Low.Given() && (err != nil || n < 0) {
			return w.refuse(refusal.Reason{
				Code: refusal.ConcentrationTooLow, Field: "diluent",
				Got: s.Concentration(m.Concentration), Want: "at least " + s.Concentration(d.Low.Value) + " in " + d.Name,
				Rule: "R10", Source: d.Low.Source.Title, Pos: w.o.Pos,
				Message: fmt.Sprintf("%s is weaker than %s may be in %s", s.Concentration(m.Concentration), w.plan.Drug.Name, d.Name),
				Remedy:  "order a smaller volume, or another diluent",
			})
		}
	}
	return true
}

// standardHere refuses a standard preparation of another jurisdiction than the
// one that the site has picked: lists are never mixed.
func (w *work) standardHere(s formulary.Standard) bool {
	here := w.site.jurisdiction
	if here == "" || s.Jurisdiction == here {
		return true
	}
	return w.refuse(refusal.Reason{
		Code: refusal.StandardElsewhere, Field: "standard",
		Got: s.ID + ", " + s.Jurisdiction, Want: "a standard preparation of " + here,
		Rule: "R10", Source: s.Source.Title, Pos: w.o.Standard.Pos,
		Message: fmt.Sprintf("the standard preparation %q of %s belongs to %s, and the site has picked %s",
			s.ID, w.plan.Drug.Name, s.Jurisdiction, here),
		Remedy: "take one of the site's own, or write mix = \"… in …\"",
	})
}
