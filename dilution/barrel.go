package dilution

import (
	"fmt"

	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/dilution/syringe"
)

// holdingBarrel is the ordered size, or the smallest that holds the volume;
// an infusion goes into a barrel of 20 mL or more, which pumps take.
func (w *work) holdingBarrel(t target) bool {
	m, s := &w.plan.Mixture, w.plan.Style
	for _, b := range w.site.barrels {
		fits := b.Nominal().Cmp(m.FinalVolume) >= 0
		switch {
		case w.o.Size.Given() && b.Nominal().Cmp(w.o.Size.Value) != 0:
			continue
		case w.o.Size.Given() && !fits:
			return w.refuse(refusal.Reason{
				Code: refusal.VolumeAboveSyringe, Field: "size",
				Got: s.Volume(m.FinalVolume), Want: "at most " + s.Volume(b.Nominal()),
				Rule: "R8", Pos: w.o.Size.Pos,
				Message: fmt.Sprintf("%s does not fit into a %s syringe",
					s.Volume(m.FinalVolume), s.Volume(b.Nominal())),
				Remedy: "take a larger syringe or order less",
			})
		case !w.o.Size.Given() && (!fits || w.tooSmallForPump(b)):
			continue
		}
		m.FinalBarrel = b
		return w.onGraduation(b, t)
	}
	if w.o.Size.Given() && w.largest().Cmp(m.FinalVolume) >= 0 {
		return w.refuse(refusal.Reason{
			Code: refusal.SyringeUnknown, Field: "size",
			Got: w.o.Size.Text, Want: w.sizes(),
			Rule: "R8", Pos: w.o.Size.Pos,
			Message: fmt.Sprintf("a %s syringe is not stocked", s.Volume(w.o.Size.Value)),
			Remedy:  "use one of: " + w.sizes(),
		})
	}
	return w.refuse(refusal.Reason{
		Code: refusal.VolumeAboveSyringe, Field: t.field,
		Got: s.Volume(m.FinalVolume), Want: "at most " + s.Volume(w.largest()),
		Rule: "R8", Pos: t.pos,
		Message: fmt.Sprintf("%s does not fit into the largest syringe, %s",
			s.Volume(m.FinalVolume), s.Volume(w.largest())),
		Remedy: "order a smaller volume, or a bag (method = \"add to\")",
	})
}

// pumpSmallest is the smallest barrel offered for a pump: common practice.
const pumpSmallest = "20 mL"

func (w *work) tooSmallForPump(b syringe.Barrel) bool {
	least, err := quantity.ParseVolume(pumpSmallest)
	return w.o.Infusion && err == nil && b.Nominal().Cmp(least) < 0
}

func (w *work) sizes() string {
	var out []string
	for _, b := range w.site.barrels {
		out = append(out, w.plan.Style.Volume(b.Nominal()))
	}
	return joinOr(out)
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
