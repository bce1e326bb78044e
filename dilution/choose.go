package dilution

import (
	"fmt"

	"drawup/dilution/formulary"
	"drawup/dilution/refusal"
)

// findDrug looks the drug up and applies its absolute bans.
func (w *work) findDrug() bool {
	d, near, ok := w.f.Find(w.o.Drug.Value)
	if !ok {
		remedy := "add it to the formulary (whoever keeps it does that), or check the spelling; " +
			"drawup formulary list shows what there is"
		if len(near) > 0 {
			remedy = "was " + joinOr(near) + " meant?"
		}
		return w.refuse(refusal.Reason{
			Code: refusal.DrugUnknown, Field: "drug",
			Got: w.o.Drug.Text, Want: "a drug of the formulary",
			Rule: "R10", Pos: w.o.Drug.Pos,
			Message: fmt.Sprintf("%q is not in the formulary", w.o.Drug.Value),
			Remedy:  remedy,
		})
	}
	w.plan.Drug = d
	if w.o.Infusion && d.NeverAsInfusion != nil {
		return w.refuse(refusal.Reason{
			Code: refusal.NeverAsInfusion, Field: "infusion",
			Got: d.Name, Want: "a single dose",
			Rule: "R11", Source: d.NeverAsInfusion.Source.Title,
			Pos:     w.o.Drug.Pos,
			Message: fmt.Sprintf("%s must never be given as an infusion: %s", d.Name, d.NeverAsInfusion.Text),
			Remedy:  "choose another drug for maintenance; no setting passes this limit",
		})
	}
	if !w.o.Infusion && d.NeverAsBolus != nil {
		return w.refuse(refusal.Reason{
			Code: refusal.NeverAsBolus, Field: "syringe",
			Got: d.Name, Want: "an infusion",
			Rule: "R11", Source: d.NeverAsBolus.Source.Title,
			Pos:     w.o.Drug.Pos,
			Message: fmt.Sprintf("%s must never be given as a bolus: %s", d.Name, d.NeverAsBolus.Text),
			Remedy:  "order it as an infusion; no setting passes this limit",
		})
	}
	return true
}

// choosePresentation takes the one that is ordered, or the only one that may
// be used this way.
func (w *work) choosePresentation() bool {
	d := w.plan.Drug
	if w.o.Presentation.Given() {
		p, ok := d.Presentation(w.o.Presentation.Value)
		if !ok {
			return w.refuse(refusal.Reason{
				Code: refusal.PresentationUnknown, Field: "presentation",
				Got: w.o.Presentation.Text, Want: joinOr(ids(d.Presentations)),
				Rule: "R10", Pos: w.o.Presentation.Pos,
				Message: fmt.Sprintf("the formulary lists no %q for %s", w.o.Presentation.Value, d.Name),
				Remedy:  "use one of: " + joinOr(ids(d.Presentations)),
			})
		}
		if !p.For(w.use()) {
			return w.refuse(refusal.Reason{
				Code: refusal.PresentationNotPump, Field: "presentation",
				Got: p.ID, Want: "a presentation for " + w.use(),
				Rule: "R10", Source: p.Source.Title,
				Pos:     w.o.Presentation.Pos,
				Message: fmt.Sprintf("%q of %s is not listed for use as %s", p.ID, d.Name, w.use()),
				Remedy:  "use one of: " + joinOr(ids(w.usable())),
			})
		}
		w.plan.Presentation = p
		return w.permitted()
	}
	fits := w.usable()
	switch len(fits) {
	case 0:
		return w.refuse(refusal.Reason{
			Code: refusal.FormularyBlank, Field: "presentation",
			Want: "a presentation for " + w.use(), Rule: "R10",
			Pos:     w.o.Drug.Pos,
			Message: fmt.Sprintf("the formulary lists no presentation of %s for use as %s", d.Name, w.use()),
			Remedy:  "add one with its source to the formulary (whoever keeps it does that)",
		})
	case 1:
		w.plan.Presentation = fits[0]
		return w.permitted()
	}
	return w.refuse(refusal.Reason{
		Code: refusal.PresentationUnclear, Field: "presentation",
		Want: joinOr(ids(fits)), Rule: "R10",
		Pos: w.o.Pos,
		Message: fmt.Sprintf(
			"%s comes in more than one presentation and the order does not say which is on the bench",
			d.Name,
		),
		Remedy: "write presentation = one of: " + joinOr(ids(fits)),
	})
}

// usable are the presentations that may be used this way. One that may not go
// into a pump, or not by this route, still counts when there is no other, so
// that the refusal can say why.
func (w *work) usable() []formulary.Presentation {
	var listed, out []formulary.Presentation
	for _, p := range w.plan.Drug.Presentations {
		if !p.For(w.use()) {
			continue
		}
		listed = append(listed, p)
		pump := w.o.Infusion && p.NotForPump != nil
		if !pump && w.routeFits(p) && !(neuraxial(w.plan.Route) && p.Preserved != nil) {
			out = append(out, p)
		}
	}
	if len(out) == 0 {
		return listed
	}
	return out
}

func ids(list []formulary.Presentation) []string {
	var out []string
	for _, p := range list {
		out = append(out, fmt.Sprintf("%q", p.ID))
	}
	return out
}

// forThisAge refuses a presentation that its source keeps from younger patients
// (R10). Without an age on the order nothing is compared.
func (w *work) forThisAge() bool {
	p := w.plan.Presentation
	if !w.size.Age.Less(p.AgeFrom) {
		return true
	}
	return w.refuse(refusal.Reason{
		Code: refusal.AgeOutside, Field: "presentation",
		Got: w.size.Age.String(), Want: "from " + p.AgeFrom.String(),
		Rule: "R10", Source: p.Source.Title, Pos: w.o.Drug.Pos,
		Message: fmt.Sprintf("%q of %s is for patients from %s", p.ID, w.plan.Drug.Name, p.AgeFrom),
		Remedy:  "take a presentation for this age",
	})
}

// powderKnown refuses a powder whose volume after mixing is unknown (R7).
func (w *work) powderKnown() bool {
	p := w.plan.Presentation
	if p.Volume.Given() {
		if p.Powder() && len(p.AddFluids) == 0 {
			return w.refuse(refusal.Reason{
				Code: refusal.FormularyBlank, Field: "add_fluids",
				Want: "a fluid to mix the powder with", Rule: "R10", Source: p.Source.Title, Pos: w.o.Drug.Pos,
				Message: fmt.Sprintf("the formulary does not say what the powder of %q is mixed with", p.ID),
				Remedy:  "add the fluid with its source to the formulary (whoever keeps it does that)",
			})
		}
		if p.Negligible {
			w.caution(refusal.Reason{
				Code: refusal.NegligibleDisplacement, Field: "displacement",
				Rule: "R7", Source: p.Displacement.Source.Title,
				Message: "the volume of the powder itself is taken as nothing, as its source does",
			})
		}
		return true
	}
	return w.refuse(refusal.Reason{
		Code: refusal.DisplacementBlank, Field: "displacement",
		Want: "a displacement volume, or a source that calls it negligible", Rule: "R7",
		Pos: w.o.Drug.Pos,
		Message: fmt.Sprintf(
			"the formulary does not say how much volume the powder of %q takes, "+
				"so no concentration can be worked out",
			p.ID,
		),
		Remedy: "add the displacement of the product in your hand, with its source, to the formulary " +
			"(whoever keeps it does that)",
	})
}
