package dilution

import (
	"fmt"

	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/dilution/syringe"
)

// holdingBarrel is the ordered size, or the smallest that holds the volume and
// that a pump takes, for an infusion. Of the syringes on a shelf one that has a
// line at the volume goes before one that has none.
func (w *work) holdingBarrel(t target) bool {
	m, s := &w.plan.Mixture, w.plan.Style
	var fits []syringe.Barrel
	for _, b := range w.site.barrels {
		holds := b.Nominal().Cmp(m.FinalVolume) >= 0
		switch {
		case w.o.Size.Given() && b.Nominal().Cmp(w.o.Size.Value) != 0:
			continue
		case w.o.Size.Given() && !holds:
			return w.refuse(refusal.Reason{
				Code: refusal.VolumeAboveSyringe, Field: "size",
				Got: s.Volume(m.FinalVolume), Want: "at most " + s.Volume(b.Nominal()),
				Rule: "R8", Pos: w.o.Size.Pos,
				Message: fmt.Sprintf("%s does not fit into a %s syringe",
					s.Volume(m.FinalVolume), s.Volume(b.Nominal())),
				Remedy: "take a larger syringe or order less",
			})
		case w.o.Size.Given() && w.site.stock != nil && w.notForPump(b):
			return w.refuse(w.noPumpTakes(b.Nominal(), "size", w.o.Size.Pos))
		case !w.o.Size.Given() && (!holds || w.notForPump(b)):
			continue
		}
		fits = append(fits, b)
	}
	if len(fits) == 0 {
		return w.refuse(w.noHolder(t))
	}
	m.FinalBarrel = w.holding(fits)
	return w.onGraduation(m.FinalBarrel, t)
}

// holding is the barrel that the target has settled, the first on a shelf that
// shows the final volume on a line, else the first.
func (w *work) holding(fits []syringe.Barrel) syringe.Barrel {
	for _, b := range fits {
		if sameBarrel(b, w.holder) {
			return b
		}
	}
	if w.site.stock != nil {
		for _, b := range fits {
			if b.Look(w.plan.Mixture.FinalVolume).Moved.Sign() == 0 {
				return b
			}
		}
	}
	return fits[0]
}

// noHolder says that no syringe holds the final volume, or none of the size that
// is ordered, or none that a pump takes.
func (w *work) noHolder(t target) refusal.Reason {
	m, s := w.plan.Mixture, w.plan.Style
	if w.o.Size.Given() && w.largest().Cmp(m.FinalVolume) >= 0 {
		return refusal.Reason{
			Code: refusal.SyringeUnknown, Field: "size",
			Got: w.o.Size.Text, Want: w.sizesWords(),
			Rule: "R8", Pos: w.o.Size.Pos,
			Message: fmt.Sprintf("a %s syringe is not stocked", s.Volume(w.o.Size.Value)),
			Remedy:  "use one of: " + w.sizesWords(),
		}
	}
	if w.o.Infusion && w.site.stock != nil && w.largest().Cmp(m.FinalVolume) >= 0 {
		return w.noPumpTakes(w.largest(), t.field, t.pos)
	}
	return refusal.Reason{
		Code: refusal.VolumeAboveSyringe, Field: t.field,
		Got: s.Volume(m.FinalVolume), Want: "at most " + s.Volume(w.largest()),
		Rule: "R8", Pos: t.pos,
		Message: fmt.Sprintf("%s does not fit into the largest syringe, %s",
			s.Volume(m.FinalVolume), s.Volume(w.largest())),
		Remedy: "order a smaller volume, or a bag (method = \"add to\")",
	}
}

// noPumpTakes says that the syringe fits no pump on the shelf.
func (w *work) noPumpTakes(nominal quantity.Volume, field string, pos refusal.Pos) refusal.Reason {
	s := w.plan.Style
	var takes []string
	for _, b := range w.site.barrels {
		if !w.notForPump(b) {
			takes = append(takes, s.Volume(b.Nominal()))
		}
	}
	want := "a size that a pump takes"
	if len(takes) > 0 {
		want = joinOr(unique(takes))
	}
	message := fmt.Sprintf("no pump on the shelf takes a %s syringe", s.Volume(nominal))
	if !w.o.Size.Given() && w.plan.Mixture.FinalVolume.Given() {
		message = fmt.Sprintf("no syringe that a pump on the shelf takes holds %s", s.Volume(w.plan.Mixture.FinalVolume))
	}
	return refusal.Reason{
		Code: refusal.SyringeNotForPump, Field: field, Got: s.Volume(nominal), Want: want, Rule: "R8", Pos: pos,
		Message: message,
		Remedy:  "order less, or another size; or put on the shelf's list what the pump takes",
	}
}

// pumpSmallest is the smallest barrel offered for a pump: common practice.
const pumpSmallest = "20 mL"

// notForPump reports a syringe that the infusion cannot go into: one that no
// pump on the shelf takes, or without a list of pumps one below 20 mL.
func (w *work) notForPump(b syringe.Barrel) bool {
	if !w.o.Infusion {
		return false
	}
	if s := w.site.stock; s != nil && len(s.pumps) > 0 {
		return len(s.pumpsFor(b.Nominal())) == 0
	}
	least, err := quantity.ParseVolume(pumpSmallest)
	return err == nil && b.Nominal().Cmp(least) < 0
}

func (w *work) sizesWords() string {
	var out []string
	for _, b := range w.site.barrels {
		out = append(out, w.plan.Style.Volume(b.Nominal()))
	}
	return joinOr(unique(out))
}

// onGraduation refuses a final volume that the holding barrel cannot show.
func (w *work) onGraduation(b syringe.Barrel, t target) bool {
	m, s := &w.plan.Mixture, w.plan.Style
	if m.Method == Neat {
		return true
	}
	at, _, err := m.FinalVolume.ToStep(b.Step(), quantity.HalfUp)
	if err != nil {
		return w.fault(err, t.field, t.pos)
	}
	if at.Cmp(m.FinalVolume) == 0 {
		return true
	}
	return w.refuse(refusal.Reason{
		Code: refusal.VolumeOffGraduation, Field: "volume",
		Got: s.Volume(m.FinalVolume), Want: "a multiple of " + s.Volume(b.Step()),
		Rule: "R8", Pos: t.pos,
		Message: fmt.Sprintf("the %s barrel has no graduation at %s",
			s.Volume(b.Nominal()), s.Volume(m.FinalVolume)),
		Remedy: "order " + s.Volume(at) + ", or another syringe size",
	})
}
