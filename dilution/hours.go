package dilution

import (
	"fmt"
	"math/big"
	"time"

	"drawup/dilution/order"
	"drawup/dilution/pump"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/dilution/syringe"
)

// forHours is a syringe of the ordered concentration that lasts the ordered hours
// at the start rate, as the pump is set: what runs in that time, what fills the
// line and what stays behind, up to the next line of the smallest giving syringe
// that holds it.
func (w *work) forHours() (target, bool) {
	o, s := w.o, w.plan.Style
	t := target{field: "hours", pos: o.Hours.Pos}
	part, ok := w.startPart()
	if !ok {
		return t, false
	}
	set, err := pump.Set(o.Start.Value, part.per(), o.Concentration.Value, w.site.step)
	if err != nil {
		return t, w.fault(err, "start", o.Start.Pos)
	}
	run := new(big.Rat).Mul(set.Rate.Rat(), big.NewRat(int64(o.Hours.Value/time.Minute), 60))
	var need quantity.Volume
	for _, b := range w.site.barrels {
		if o.Size.Given() && b.Nominal().Cmp(o.Size.Value) != 0 || !o.Size.Given() && w.notForPump(b) {
			continue
		}
		need = w.with(quantity.Millilitres(run), b)
		whole, _, err := need.ToStep(b.Step(), quantity.Up)
		if err != nil {
			return t, w.fault(err, "hours", o.Hours.Pos)
		}
		if whole = whole.Plus(b.Step().Times(w.steps)); whole.Cmp(b.Nominal()) > 0 {
			continue
		}
		w.holder, t.volume = b, whole
		w.o.Volume = order.Field[quantity.Volume]{Value: whole, Text: whole.Exact() + " mL", Pos: o.Hours.Pos}
		if t.amount, err = whole.Holds(o.Concentration.Value); err != nil {
			return t, w.fault(err, "concentration", o.Concentration.Pos)
		}
		return t, true
	}
	if !need.Given() {
		return t, w.refuse(w.noPumpTakes(w.largest(), "hours", o.Hours.Pos))
	}
	return t, w.refuse(refusal.Reason{
		Code: refusal.VolumeAboveSyringe, Field: "hours", Got: s.Volume(need), Want: "what a giving syringe holds", Rule: "R8", Pos: o.Hours.Pos,
		Message: fmt.Sprintf("%s at %s take %s with what fills the line and stays behind, more than any giving syringe holds",
			words(o.Hours.Value), s.FlowRate(set.Rate), s.Volume(need)),
		Remedy: "order fewer hours or a stronger mixture",
	})
}

// words is a time as an order writes it: "12 h", "90 min".
func words(d time.Duration) string {
	if d%time.Hour == 0 {
		return fmt.Sprintf("%d h", d/time.Hour)
	}
	return fmt.Sprintf("%d min", d/time.Minute)
}

// with is a volume and what of the syringe never runs: what fills the line, and
// the dead space.
func (w *work) with(v quantity.Volume, b syringe.Barrel) quantity.Volume {
	if p := w.o.Priming.Value; p.Given() {
		v = v.Plus(p)
	}
	if d := w.deadSpace(b); d.Given() {
		v = v.Plus(d)
	}
	return v
}

// deadSpace is what stays behind: the order's figure, else the shelf's for the
// giving syringe; the shelf's counts only where the order asks how long it lasts.
func (w *work) deadSpace(b syringe.Barrel) quantity.Volume {
	switch {
	case w.o.DeadSpace.Value.Given():
		return w.o.DeadSpace.Value
	case w.site.stock != nil && (w.o.Hours.Given() || w.o.Priming.Given()):
		return w.site.stock.deadSpace(b)
	}
	return quantity.Volume{}
}

// longEnough works how long the infusion really lasts, and holds it against the
// hours that are asked for.
func (w *work) longEnough(part *InfusionPart) bool {
	m, s := w.plan.Mixture, w.plan.Style
	part.Usable, part.Wanted = part.Minutes, int64(w.o.Hours.Value/time.Minute)
	part.Priming, part.DeadSpace = w.o.Priming.Value, w.deadSpace(m.FinalBarrel)
	if lost := w.with(quantity.Millilitres(new(big.Rat)), m.FinalBarrel); !lost.IsZero() {
		left, err := m.FinalVolume.Minus(lost)
		if err != nil || left.IsZero() {
			return w.refuse(refusal.Reason{
				Code: refusal.ContradictoryAmounts, Field: "priming", Got: s.Volume(lost), Want: "less than " + s.Volume(m.FinalVolume), Rule: "R8", Pos: w.lostPos(),
				Message: fmt.Sprintf("what fills the line and stays behind, %s, is all that the syringe holds, %s", s.Volume(lost), s.Volume(m.FinalVolume)),
				Remedy:  "check priming and dead_space and their units",
			})
		}
		if part.Usable, err = left.Minutes(part.Start.Rate); err != nil {
			return w.fault(err, "hours", w.o.Hours.Pos)
		}
	}
	if part.Usable >= part.Wanted {
		return true
	}
	if w.o.Concentration.Given() && w.holder.Given() {
		w.short = true
		return false
	}
	return w.refuse(refusal.Reason{
		Code: refusal.HoursNotReached, Field: "hours", Got: hours(part.Usable), Want: "at least " + words(w.o.Hours.Value), Rule: "R8", Pos: w.o.Hours.Pos,
		Message: fmt.Sprintf("at %s the syringe is empty after %s, what fills the line and stays behind counted off; %s are asked for",
			s.FlowRate(part.Start.Rate), hours(part.Usable), words(w.o.Hours.Value)),
		Remedy: "order fewer hours, or a stronger mixture; or leave the mixture out, so that a standard preparation that lasts is chosen",
	})
}

// lostPos is where the order says what never reaches the patient.
func (w *work) lostPos() refusal.Pos {
	if w.o.Priming.Given() {
		return w.o.Priming.Pos
	}
	return w.o.DeadSpace.Pos
}

// hoursCut says that adding lines to the syringe was given up.
func (w *work) hoursCut() refusal.Reason {
	return refusal.Reason{
		Code: refusal.SearchCut, Field: "hours", Got: fmt.Sprintf("%d lines more", mostSteps), Want: "a syringe that lasts", Rule: "R8", Pos: w.o.Hours.Pos,
		Message: fmt.Sprintf("with %d lines more in it the syringe still does not last %s; the search was cut short there", mostSteps, words(w.o.Hours.Value)),
		Remedy:  "write concentration and volume, or a standard preparation",
	}
}

// standards is the order with each standard preparation that is for this line
// and for this site, those that hold least drug first.
func (w *work) standards() ([]variant, bool) {
	line := w.line()
	var out []variant
	for _, st := range w.plan.Drug.Standards {
		if st.Line != "any" && st.Line != line || w.site.jurisdiction != "" && st.Jurisdiction != w.site.jurisdiction {
			continue
		}
		o := w.o
		o.Standard = order.Field[string]{Value: st.ID, Text: st.ID, Pos: w.o.Hours.Pos}
		holds := func() string { return w.plan.Style.Amount(st.Amount) + " in it" }
		out = append(out, variant{o, "standard " + st.ID, []point{{st.Amount.Rat(), holds}}})
	}
	if len(out) > 0 {
		return out, true
	}
	return nil, w.refuse(refusal.Reason{
		Code: refusal.StandardUnknown, Field: "hours", Got: "hours alone", Want: "a standard preparation to choose", Rule: "R10", Pos: w.o.Hours.Pos,
		Message: fmt.Sprintf("the formulary lists no standard preparation of %s for a %s line here, and the order names no mixture", w.plan.Drug.Name, line),
		Remedy:  `write the concentration as well, or mix = "… in …"`,
	})
}
