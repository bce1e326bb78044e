package dilution

import (
	"fmt"
	"math/big"

	"drawup/dilution/order"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/dilution/syringe"
)

// forDoses is a syringe that holds so many doses. Each dose is read off the
// giving syringe, so that the syringe is filled with so many doses as they are
// read, not as they are worked out: the last is then whole.
func (w *work) forDoses() (target, bool) {
	o := w.o
	one, ok := w.doseAmount()
	if !ok {
		return target{}, false
	}
	t := target{field: "doses", pos: o.Doses.Pos}
	if o.Volume.Given() {
		t.amount, t.volume = one.Times(o.Doses.Value), o.Volume.Value
		return t, true
	}
	strength := w.plan.Mixture.Strength
	if o.Concentration.Given() {
		strength = o.Concentration.Value
	}
	each, err := one.DrawnAt(strength)
	if err != nil {
		return t, w.fault(err, "dose", o.Dose.Pos)
	}
	whole, ok := w.holderFor(each, strength)
	if !ok {
		return t, false
	}
	if t.amount, err = whole.Holds(strength); err != nil {
		return t, w.fault(err, "dose", o.Dose.Pos)
	}
	if o.Concentration.Given() {
		t.volume = whole
		w.o.Volume = order.Field[quantity.Volume]{Value: whole, Text: whole.Exact() + " mL", Pos: o.Doses.Pos}
	}
	return t, true
}

// holderFor finds the smallest giving syringe that holds the doses as it shows
// them, and how much they then are.
func (w *work) holderFor(each quantity.Volume, c quantity.Concentration) (quantity.Volume, bool) {
	s, n := w.plan.Style, w.o.Doses.Value
	for _, b := range w.site.barrels {
		if w.o.Size.Given() && b.Nominal().Cmp(w.o.Size.Value) != 0 {
			continue
		}
		line, ok := w.doseLine(each, b, c)
		if !ok {
			continue
		}
		if whole := line.Times(n); whole.Cmp(b.Nominal()) <= 0 {
			w.holder = b
			return whole, true
		}
	}
	if whole := each.Times(n); whole.Cmp(w.largest()) <= 0 && !w.o.Size.Given() {
		return whole, w.refuse(refusal.Reason{
			Code: refusal.VolumeOffGraduation, Field: "doses", Got: s.Volume(each), Want: "a dose that a giving syringe shows within " + s.Percent(w.site.tolerance),
			Rule: "R8", Pos: w.o.Doses.Pos,
			Message: fmt.Sprintf("no syringe that holds %d doses of %s shows one of them within %s", n, s.Volume(each), s.Percent(w.site.tolerance)),
			Remedy:  "order fewer doses or a weaker mixture",
		})
	}
	most := w.largest()
	if w.o.Size.Given() {
		most = w.o.Size.Value
	}
	return each, w.refuse(refusal.Reason{
		Code: refusal.VolumeAboveSyringe, Field: "doses", Got: s.Volume(each.Times(n)), Want: "at most " + s.Volume(most), Rule: "R8", Pos: w.o.Doses.Pos,
		Message: fmt.Sprintf("%d doses of %s are %s, more than the %s syringe holds, or more than it shows dose by dose", n, s.Volume(each), s.Volume(each.Times(n)), s.Volume(most)),
		Remedy:  "order fewer doses, or a stronger mixture",
	})
}

// doseLine is the line at which a dose is read on a barrel: the nearest, or the
// one below where the nearest passes a limit; false where none is near enough.
func (w *work) doseLine(each quantity.Volume, b syringe.Barrel, c quantity.Concentration) (quantity.Volume, bool) {
	line, moved, err := each.ToStep(b.Step(), quantity.HalfUp)
	if err != nil {
		return line, false
	}
	d := w.plan.Dose
	if given, err := line.Holds(c); err != nil || passed(d.ceilings, d.Amount.Rat(), given.Rat()) != nil {
		if line, moved, err = each.ToStep(b.Step(), quantity.Down); err != nil {
			return line, false
		}
	}
	far := new(big.Rat).Abs(moved).Cmp(w.site.tolerance.Rat()) > 0
	return line, !far && line.Cmp(w.site.smallest) >= 0
}

// dosesFit refuses a syringe in which the last of its doses is not whole.
func (w *work) dosesFit(d *DosePart) bool {
	n := w.o.Doses.Value
	m, s := w.plan.Mixture, w.plan.Style
	if n == 0 || d.Volume.Times(n).Cmp(m.FinalVolume) <= 0 {
		return true
	}
	return w.refuse(refusal.Reason{
		Code: refusal.ContradictoryAmounts, Field: "doses", Got: s.Volume(m.FinalVolume), Want: "at least " + s.Volume(d.Volume.Times(n)), Rule: "R8", Pos: w.o.Doses.Pos,
		Message: fmt.Sprintf("%d doses are read as %s each on the %s syringe, %s in all, and the syringe holds %s",
			n, s.Volume(d.Volume), s.Volume(m.FinalBarrel.Nominal()), s.Volume(d.Volume.Times(n)), s.Volume(m.FinalVolume)),
		Remedy: "take the volume out, so that it follows from the doses, or order fewer",
	})
}
