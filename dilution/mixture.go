package dilution

import (
	"fmt"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// A target is what the order wants in the syringe.
type target struct {
	amount quantity.Amount
	volume quantity.Volume // not given: as much as the amount takes neat
	field  string
	pos    refusal.Pos
}

// mix works the mixture: target, containers, drawn volume, diluent, result.
func (w *work) mix() bool {
	p := w.plan.Presentation
	strength, err := p.Amount.In(p.Volume)
	if err != nil {
		return w.fault(err, "presentation", p.Pos)
	}
	w.plan.Mixture = Mixture{Method: Neat, Strength: strength}
	if p.Powder() && len(p.AddFluids) > 0 {
		w.plan.Mixture.AddFluid = w.powderFluid(p)
	}
	t, ok := w.target()
	if !ok {
		return false
	}
	if !w.chooseMethod(t) || !w.draw(t) || !w.settleFinal(t) || !w.results() || !w.measureFluid(t) || !w.fetchFluids(t) {
		return false
	}
	w.deadSpaceCounts(t)
	return true
}

// target turns the order's words into an amount and a final volume.
func (w *work) target() (target, bool) {
	o := w.o
	switch {
	case o.Infusion && o.Standard.Given():
		s, ok := w.plan.Drug.Standard(o.Standard.Value)
		if !ok {
			return target{}, w.refuse(refusal.Reason{
				Code: refusal.StandardUnknown, Field: "standard",
				Got: o.Standard.Text, Want: joinOr(standardIDs(w.plan.Drug)),
				Rule: "R10", Pos: o.Standard.Pos,
				Message: fmt.Sprintf("the formulary lists no standard preparation %q for %s",
					o.Standard.Value, w.plan.Drug.Name),
				Remedy: standardRemedy(w.plan.Drug),
			})
		}
		if !w.standardHere(s) {
			return target{}, false
		}
		w.plan.Standard = s.ID
		return target{s.Amount, s.Volume, "standard", o.Standard.Pos}, true
	case o.Infusion && o.Mixture.Given():
		return w.weightMade()
	case o.Infusion && o.Concentration.Given() && !o.Volume.Given():
		return w.forHours()
	case o.Infusion && !o.Concentration.Given():
		return target{o.MixAmount.Value, o.MixVolume.Value, "mix", o.MixAmount.Pos}, true
	case o.Doses.Given():
		return w.forDoses()
	case o.Concentration.Given():
		a, err := o.Volume.Value.Holds(o.Concentration.Value)
		if err != nil {
			return target{}, w.fault(err, "concentration", o.Concentration.Pos)
		}
		return target{a, o.Volume.Value, "concentration", o.Concentration.Pos}, true
	case o.Amount.Given():
		return target{o.Amount.Value, o.Volume.Value, "amount", o.Amount.Pos}, true
	}
	a, ok := w.doseAmount()
	return target{a, quantity.Volume{}, "dose", o.Dose.Pos}, ok
}

func standardIDs(d formulary.Drug) []string {
	var out []string
	for _, s := range d.Standards {
		out = append(out, fmt.Sprintf("%q", s.ID))
	}
	return out
}

func standardRemedy(d formulary.Drug) string {
	if len(d.Standards) == 0 {
		return "the formulary has none for this drug: write mix = \"… in …\""
	}
	return "use one of: " + joinOr(standardIDs(d))
}

// chooseMethod says which of the four sums the mixture follows and settles
// the diluent.
func (w *work) chooseMethod(t target) bool {
	m := &w.plan.Mixture
	need, err := t.amount.DrawnAt(m.Strength)
	if err != nil {
		return w.fault(err, t.field, t.pos)
	}
	bag := w.o.Method.Given() && w.o.Method.Value != MakeUpTo.String()
	switch {
	case bag && w.o.Method.Value == AddTo.String():
		m.Method, m.InBag = AddTo, true
	case bag:
		m.Method, m.InBag = WithdrawThenAdd, true
	case !t.volume.Given() || t.volume.Cmp(need) == 0:
		m.Method = Neat
	default:
		m.Method = MakeUpTo
	}
	if m.Method != AddTo && t.volume.Given() && t.volume.Cmp(need) < 0 {
		s := w.plan.Style
		return w.refuse(refusal.Reason{
			Code: refusal.ConcentrationTooHigh, Field: t.field,
			Got:  s.Amount(t.amount) + " in " + s.Volume(t.volume),
			Want: "at most " + s.Concentration(m.Strength), Rule: "R10",
			Pos: t.pos, Source: w.plan.Presentation.Source.Title,
			Message: fmt.Sprintf("%s already takes %s of %q, which is more than the final volume",
				s.Amount(t.amount), s.Volume(need), w.plan.Presentation.ID),
			Remedy: "order a larger volume, less drug, or a stronger presentation",
		})
	}
	return w.settleDiluent()
}

// settleFinal works the final volume and the barrel that holds it.
func (w *work) settleFinal(t target) bool {
	m := &w.plan.Mixture
	switch m.Method {
	case Neat:
		m.FinalVolume = m.DrugVolume
		if t.volume.Given() && t.volume.Cmp(m.DrugVolume) != 0 {
			return w.neatOffGraduation(t)
		}
	case MakeUpTo:
		m.FinalVolume = t.volume
	case AddTo:
		m.FinalVolume = t.volume.Plus(m.DrugVolume)
	case WithdrawThenAdd:
		m.FinalVolume = t.volume
	}
	if m.Method != Neat {
		d, err := m.FinalVolume.Minus(m.DrugVolume)
		if err != nil {
			return w.fault(err, t.field, t.pos)
		}
		m.DiluentVolume = d
	}
	if m.InBag {
		return w.caution(refusal.Reason{Code: refusal.BagFillUnknown, Field: "method", Rule: "R9", Pos: t.pos,
			Message: "a bag holds more than its nominal volume; the interval covers the drug and the syringe only"})
	}
	return w.holdingBarrel(t)
}

// neatOffGraduation refuses an undiluted volume that was ordered as such and
// that no graduation shows.
func (w *work) neatOffGraduation(t target) bool {
	s, m := w.plan.Style, w.plan.Mixture
	return w.refuse(refusal.Reason{
		Code: refusal.VolumeOffGraduation, Field: t.field,
		Got: s.Volume(t.volume), Want: "a volume that a graduation shows",
		Rule: "R8", Pos: t.pos,
		Message: fmt.Sprintf("no graduation shows %s of the undiluted drug", s.Volume(t.volume)),
		Remedy:  "order " + s.Volume(m.DrugVolume) + ", or another syringe size",
	})
}

// results works amount, concentration, left-over, and the drug's companions.
func (w *work) results() bool {
	m := &w.plan.Mixture
	var err error
	if m.Amount, err = m.DrugVolume.Holds(m.Strength); err != nil {
		return w.fault(err, "amount", w.o.Pos)
	}
	if m.Concentration, err = m.Amount.In(m.FinalVolume); err != nil {
		return w.fault(err, "concentration", w.o.Pos)
	}
	if m.LeftVolume, err = m.opened().Minus(m.DrugVolume); err != nil {
		return w.fault(err, "left over", w.o.Pos)
	}
	if m.LeftAmount, err = m.LeftVolume.Holds(m.Strength); err != nil {
		return w.fault(err, "left over", w.o.Pos)
	}
	return w.companions()
}

// companions works the second drug of a premix and the amount of substance.
func (w *work) companions() bool {
	m, p := &w.plan.Mixture, w.plan.Presentation
	share, err := m.Amount.Share(p.Amount)
	if err != nil {
		return w.fault(err, "amount", w.o.Pos)
	}
	if p.SecondAmount.Given() {
		m.SecondAmount = p.SecondAmount.Scaled(share, p.SecondAmount.Unit())
		if m.SecondConc, err = m.SecondAmount.In(m.FinalVolume); err != nil {
			return w.fault(err, "second drug", w.o.Pos)
		}
	}
	if f := w.plan.Drug.Substance; f.Given() {
		grams, err := m.Amount.Share(quantity.AmountOf(one(), quantity.Gram()))
		if err != nil {
			return w.fault(err, "amount", w.o.Pos)
		}
		m.Substance = f.Value.PerGram.Scaled(grams, quantity.Millimole())
		if m.SubstanceConc, err = m.Substance.In(m.FinalVolume); err != nil {
			return w.fault(err, "amount", w.o.Pos)
		}
	}
	return true
}
