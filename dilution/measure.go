package dilution

import (
	"errors"
	"fmt"
	"math/big"

	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/dilution/syringe"
)

// draw measures the drug's volume and counts the containers.
func (w *work) draw(t target) bool {
	m := &w.plan.Mixture
	need, err := t.amount.DrawnAt(m.Strength)
	if err != nil {
		return w.fault(err, t.field, t.pos)
	}
	r, ok := w.measure(need, t.field, t.pos, w.ceiling(t))
	if !ok {
		return false
	}
	m.DrugWanted, m.DrugReading, m.DrugVolume = need, r, r.Volume
	n, ok := w.open(t)
	if !ok {
		return false
	}
	m.Containers = n
	if n > mostContainers {
		w.caution(w.manyContainers(n, t.field, t.pos))
	}
	return true
}

// mostContainers is how many containers one syringe may take without a caution:
// our own choice.
const mostContainers = 10

// manyContainers says that more have to be opened.
func (w *work) manyContainers(n int, field string, pos refusal.Pos) refusal.Reason {
	return refusal.Reason{
		Code: refusal.ContainersMany, Field: field,
		Got: fmt.Sprint(n), Want: "10 or fewer",
		Rule: "R8", Pos: pos,
		Message: fmt.Sprintf("%d containers have to be opened for one syringe; is a unit wrong?", n),
		Remedy:  "check the amount, or use a larger presentation",
	}
}

// measure finds the barrel for v and turns its errors into reasons (R8).
func (w *work) measure(
	v quantity.Volume,
	field string,
	pos refusal.Pos,
	passes func(quantity.Volume) bool,
) (syringe.Reading, bool) {
	r, err := syringe.Measure(v, w.site.barrels, w.site.smallest, w.site.tolerance)
	var below *syringe.BelowSmallest
	var none *syringe.NoBarrel
	var off *syringe.OffGraduation
	switch {
	case errors.As(err, &below):
		return r, w.refuse(w.tooLittle(v, field, pos))
	case errors.As(err, &none):
		return r, w.refuse(w.tooMuch(v, field, pos))
	case errors.As(err, &off):
		return r, w.refuse(w.offGraduation(v, field, pos))
	case err != nil:
		return r, w.fault(err, field, pos)
	}
	if passes(r.Volume) {
		var ok bool
		if r, ok = w.lowered(r, v, field, pos); !ok {
			return r, false
		}
	}
	if r.UnderFifth {
		w.caution(w.underFifth(r, field, pos))
	}
	if r.MovedPercent.Sign() != 0 {
		w.caution(w.moved(r, v, field, pos))
	}
	return r, true
}

// tooLittle says that v is below the smallest volume measured (R8).
func (w *work) tooLittle(v quantity.Volume, field string, pos refusal.Pos) refusal.Reason {
	s := w.plan.Style
	return refusal.Reason{
		Code: refusal.VolumeBelowMeasurable, Field: field,
		Got: s.Volume(v), Want: "at least " + s.Volume(w.site.smallest),
		Rule: "R8", Pos: pos,
		Message: fmt.Sprintf("%s of %q is too little to measure", s.Volume(v), w.plan.Presentation.ID),
		Remedy:  w.tooSmallRemedy(),
	}
}

// tooMuch says that v is more than the largest barrel holds (R8).
func (w *work) tooMuch(v quantity.Volume, field string, pos refusal.Pos) refusal.Reason {
	s := w.plan.Style
	return refusal.Reason{
		Code: refusal.VolumeAboveSyringe, Field: field,
		Got: s.Volume(v), Want: "at most " + s.Volume(w.largest()),
		Rule: "R8", Pos: pos,
		Message: fmt.Sprintf("%s does not fit into the largest syringe, %s",
			s.Volume(v), s.Volume(w.largest())),
		Remedy: "order less, or a stronger presentation; check the unit",
	}
}

// offGraduation says that no barrel shows v within the tolerance (R8).
func (w *work) offGraduation(v quantity.Volume, field string, pos refusal.Pos) refusal.Reason {
	s := w.plan.Style
	return refusal.Reason{
		Code: refusal.VolumeOffGraduation, Field: field,
		Got: s.Volume(v), Want: "a volume that a graduation shows within " + s.Percent(w.site.tolerance),
		Rule: "R8", Pos: pos,
		Message: fmt.Sprintf("no graduation shows %s within %s; the nearest is too far off",
			s.Volume(v), s.Percent(w.site.tolerance)),
		Remedy: w.tooSmallRemedy(),
	}
}

// underFifth says that the volume read is under a fifth of its barrel (R8).
func (w *work) underFifth(r syringe.Reading, field string, pos refusal.Pos) refusal.Reason {
	s := w.plan.Style
	return refusal.Reason{
		Code: refusal.VolumeUnderFifth, Field: field,
		Got: s.Volume(r.Volume), Want: "a fifth of the barrel or more",
		Rule: "R8", Pos: pos,
		Source: "ISO 7886-1 tolerance table; " +
			"compounding study of volumes under a fifth of the capacity (abstract)",
		Message: fmt.Sprintf("%s is under a fifth of the %s barrel; it may be off by %s",
			s.Volume(r.Volume), s.Volume(r.Barrel.Nominal()), s.Volume(r.Tolerance)),
	}
}

// moved says that v is moved to a graduation, and by how much (R2).
func (w *work) moved(r syringe.Reading, v quantity.Volume, field string, pos refusal.Pos) refusal.Reason {
	s := w.plan.Style
	word := graduationWord(w.plan.Dose != nil && w.plan.Dose.Down)
	return refusal.Reason{
		Code: refusal.VolumeOffGraduation, Field: field,
		Got: s.Volume(v), Want: s.Volume(r.Volume),
		Rule: "R2", Pos: pos,
		Message: fmt.Sprintf("%s is moved to "+word+", %s: %s %s", s.Volume(v), s.Volume(r.Volume),
			percentOf(s, r.MovedPercent), moreOrLess(r.MovedPercent.Sign())),
	}
}

// graduationWord names the graduation that was taken.
func graduationWord(lowered bool) string {
	if lowered {
		return "the graduation below, so that no limit is passed"
	}
	return "the nearest graduation"
}

// ceiling tells whether a drawn volume would give more than a limit allows,
// where the ordered dose itself keeps it. It matters only where the syringe
// holds just the dose.
func (w *work) ceiling(t target) func(quantity.Volume) bool {
	return func(v quantity.Volume) bool {
		d := w.plan.Dose
		if t.field != "dose" || d == nil {
			return false
		}
		given, err := v.Holds(w.plan.Mixture.Strength)
		return err == nil && passed(d.ceilings, d.Amount.Rat(), given.Rat()) != nil
	}
}

// lowered takes the graduation below for a volume whose nearest one would pass
// a limit (rule R11), if it is close enough (rule R8).
func (w *work) lowered(r syringe.Reading, v quantity.Volume, field string, pos refusal.Pos) (syringe.Reading, bool) {
	s := w.plan.Style
	down, moved, err := v.ToStep(r.Barrel.Step(), quantity.Down)
	if err != nil {
		return r, w.fault(err, field, pos)
	}
	if new(big.Rat).Abs(moved).Cmp(w.site.tolerance.Rat()) > 0 || down.Cmp(w.site.smallest) < 0 {
		return r, w.refuse(refusal.Reason{
			Code: refusal.RoundedPastLimit, Field: field,
			Got: s.Volume(r.Volume), Want: "a volume that keeps the limit",
			Rule: "R11", Pos: pos,
			Message: fmt.Sprintf(
				"the graduation nearest to %s, %s, gives more than the limit, and the one below, %s, is too far off",
				s.Volume(v), s.Volume(r.Volume), s.Volume(down),
			),
			Remedy: "order less, or a weaker mixture",
		})
	}
	low, err := r.Barrel.Read(down, w.site.smallest, w.site.tolerance)
	if err != nil {
		return r, w.fault(err, field, pos)
	}
	low.MovedPercent = moved
	w.plan.Dose.Down = true
	return low, true
}

func moreOrLess(sign int) string {
	if sign > 0 {
		return "more than asked"
	}
	return "less than asked"
}

func (w *work) largest() quantity.Volume {
	largest := w.site.barrels[0].Nominal()
	for _, b := range w.site.barrels {
		if b.Nominal().Cmp(largest) > 0 {
			largest = b.Nominal()
		}
	}
	return largest
}

// tooSmallRemedy names a weaker presentation if there is one, else dilution.
func (w *work) tooSmallRemedy() string {
	var weaker []string
	for _, p := range w.usable() {
		c, err := p.Amount.In(p.Volume)
		if err != nil {
			continue
		}
		if n, err := c.Cmp(w.plan.Mixture.Strength); err == nil && n < 0 {
			weaker = append(weaker, fmt.Sprintf("%q", p.ID))
		}
	}
	if len(weaker) > 0 {
		return "use the weaker presentation " + joinOr(weaker)
	}
	if len(w.plan.Presentation.Diluents) > 0 {
		return "dilute first: give concentration and volume as well as the dose, with " +
			joinOr(diluentNames(w.plan.Presentation.Diluents))
	}
	return "no weaker presentation and no diluent is listed: order a larger amount, or another drug"
}
