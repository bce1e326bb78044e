package dilution

import (
	"errors"
	"fmt"
	"math/big"
	"strings"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/dilution/syringe"
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
		w.plan.Mixture.AddFluid = p.AddFluids[0]
	}
	t, ok := w.target()
	if !ok {
		return false
	}
	return w.chooseMethod(t) && w.draw(t) && w.settleFinal(t) && w.results()
}

// target turns the order's words into an amount and a final volume.
func (w *work) target() (target, bool) {
	o := w.o
	switch {
	case o.Infusion && o.Standard.Given():
		s, ok := w.plan.Drug.Standard(o.Standard.Value)
		if !ok {
			return target{}, w.refuse(refusal.Reason{Code: refusal.StandardUnknown, Field: "standard", Got: o.Standard.Text, Want: joinOr(standardIDs(w.plan.Drug)), Rule: "R10", Pos: o.Standard.Pos,
				Message: fmt.Sprintf("the formulary lists no standard preparation %q for %s", o.Standard.Value, w.plan.Drug.Name), Remedy: standardRemedy(w.plan.Drug)})
		}
		w.plan.Standard = s.ID
		return target{s.Amount, s.Volume, "standard", o.Standard.Pos}, true
	case o.Infusion:
		return target{o.MixAmount.Value, o.MixVolume.Value, "mix", o.MixAmount.Pos}, true
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
		return w.refuse(refusal.Reason{Code: refusal.ConcentrationTooHigh, Field: t.field, Got: s.Amount(t.amount) + " in " + s.Volume(t.volume), Want: "at most " + s.Concentration(m.Strength), Rule: "R10",
			Pos: t.pos, Source: w.plan.Presentation.Source.Title, Message: fmt.Sprintf("%s already takes %s of %s, which is more than the final volume", s.Amount(t.amount), s.Volume(need), w.plan.Presentation.ID),
			Remedy: "order a larger volume, less drug, or a stronger presentation"})
	}
	return w.settleDiluent()
}

// settleDiluent checks the diluent, or its absence, against the record (R10).
func (w *work) settleDiluent() bool {
	p, m := w.plan.Presentation, &w.plan.Mixture
	if m.Method == Neat {
		if !p.Neat {
			return w.refuse(refusal.Reason{Code: refusal.MustBeDiluted, Field: "diluent", Got: "undiluted", Want: joinOr(diluentNames(p.Diluents)), Rule: "R10", Source: p.Source.Title, Pos: w.o.Pos,
				Message: fmt.Sprintf("%s of %s must be diluted before use", p.ID, w.plan.Drug.Name), Remedy: "order a concentration and a volume"})
		}
		if w.o.Diluent.Given() {
			return w.forbiddenOr(w.o.Diluent.Value, func() bool {
				return w.caution(refusal.Reason{Code: refusal.DiluentMissing, Field: "diluent", Got: w.o.Diluent.Text, Want: "none", Rule: "R5", Pos: w.o.Diluent.Pos,
					Message: "the syringe is undiluted; the diluent of the order is not used"})
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
	switch len(p.Diluents) {
	case 0:
		if !p.Neat || len(p.Forbidden) == 0 {
			return "", w.refuse(refusal.Reason{Code: refusal.FormularyBlank, Field: "diluent", Want: "a listed diluent", Rule: "R10", Source: p.Source.Title, Pos: w.o.Pos,
				Message: fmt.Sprintf("the formulary lists no diluent for %s of %s: it may be used undiluted only", p.ID, w.plan.Drug.Name), Remedy: "order it undiluted, or add a diluent with its source to the formulary (whoever keeps it does that)"})
		}
	case 1:
		return p.Diluents[0].Name, true
	}
	return "", w.refuse(refusal.Reason{Code: refusal.DiluentMissing, Field: "diluent", Want: joinOr(diluentNames(p.Diluents)), Rule: "R10", Pos: w.o.Pos,
		Message: "the order does not say what to dilute with", Remedy: "write diluent = one of: " + joinOr(diluentNames(p.Diluents))})
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
			return w.refuse(refusal.Reason{Code: refusal.DiluentForbidden, Field: "diluent", Got: name, Want: joinOr(diluentNames(w.plan.Presentation.Diluents)), Rule: "R10", Source: d.Source.Title, Pos: w.o.Diluent.Pos,
				Message: fmt.Sprintf("%s must not be mixed with %s: %s", w.plan.Drug.Name, d.Name, d.Reason), Remedy: w.diluentRemedy()})
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
	return w.refuse(refusal.Reason{Code: refusal.DiluentNotListed, Field: "diluent", Got: name, Want: joinOr(diluentNames(p.Diluents)), Rule: "R10", Source: p.Source.Title, Pos: w.o.Diluent.Pos,
		Message: fmt.Sprintf("the formulary does not list %s as a diluent for %s of %s", name, p.ID, w.plan.Drug.Name), Remedy: w.diluentRemedy()})
}

func (w *work) diluentRemedy() string {
	if len(w.plan.Presentation.Diluents) == 0 {
		return "use it undiluted"
	}
	return "use " + joinOr(diluentNames(w.plan.Presentation.Diluents))
}

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
	n, err := m.DrugVolume.Containers(w.plan.Presentation.Volume)
	if err != nil {
		return w.fault(err, t.field, t.pos)
	}
	m.Containers = n
	if n > 10 {
		w.caution(refusal.Reason{Code: refusal.ContainersMany, Field: t.field, Got: fmt.Sprint(n), Want: "10 or fewer", Rule: "R8", Pos: t.pos,
			Message: fmt.Sprintf("%d containers have to be opened for one syringe; is a unit wrong?", n), Remedy: "check the amount, or use a larger presentation"})
	}
	return true
}

// measure finds the barrel for v and turns its errors into reasons (R8).
func (w *work) measure(v quantity.Volume, field string, pos refusal.Pos, passes func(quantity.Volume) bool) (syringe.Reading, bool) {
	s := w.plan.Style
	r, err := syringe.Measure(v, w.site.barrels, w.site.smallest, w.site.tolerance)
	var below *syringe.BelowSmallest
	var none *syringe.NoBarrel
	var off *syringe.OffGraduation
	switch {
	case errors.As(err, &below):
		return r, w.refuse(refusal.Reason{Code: refusal.VolumeBelowMeasurable, Field: field, Got: s.Volume(v), Want: "at least " + s.Volume(w.site.smallest), Rule: "R8", Pos: pos,
			Message: fmt.Sprintf("%s of %s is too little to measure", s.Volume(v), w.plan.Presentation.ID), Remedy: w.tooSmallRemedy()})
	case errors.As(err, &none):
		return r, w.refuse(refusal.Reason{Code: refusal.VolumeAboveSyringe, Field: field, Got: s.Volume(v), Want: "at most " + s.Volume(w.largest()), Rule: "R8", Pos: pos,
			Message: fmt.Sprintf("%s does not fit into the largest syringe, %s", s.Volume(v), s.Volume(w.largest())), Remedy: "order less, or a stronger presentation; check the unit"})
	case errors.As(err, &off):
		return r, w.refuse(refusal.Reason{Code: refusal.VolumeOffGraduation, Field: field, Got: s.Volume(v), Want: "a volume that a graduation shows within " + s.Percent(w.site.tolerance), Rule: "R8", Pos: pos,
			Message: fmt.Sprintf("no graduation shows %s within %s; the nearest is too far off", s.Volume(v), s.Percent(w.site.tolerance)), Remedy: w.tooSmallRemedy()})
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
		w.caution(refusal.Reason{Code: refusal.VolumeUnderFifth, Field: field, Got: s.Volume(r.Volume), Want: "a fifth of the barrel or more", Rule: "R8", Pos: pos,
			Source:  "ISO 7886-1 tolerance table; compounding study of volumes under a fifth of the capacity (abstract)",
			Message: fmt.Sprintf("%s is under a fifth of the %s barrel; it may be off by %s", s.Volume(r.Volume), s.Volume(r.Barrel.Nominal()), s.Volume(r.Tolerance))})
	}
	if r.MovedPercent.Sign() != 0 {
		w.caution(refusal.Reason{Code: refusal.VolumeOffGraduation, Field: field, Got: s.Volume(v), Want: s.Volume(r.Volume), Rule: "R2", Pos: pos,
			Message: fmt.Sprintf("%s is moved to "+graduationWord(w.plan.Dose != nil && w.plan.Dose.Down)+", %s: %s %s", s.Volume(v), s.Volume(r.Volume), percentOf(s, r.MovedPercent), moreOrLess(r.MovedPercent.Sign()))})
	}
	return r, true
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
		return r, w.refuse(refusal.Reason{Code: refusal.RoundedPastLimit, Field: field, Got: s.Volume(r.Volume), Want: "a volume that keeps the limit", Rule: "R11", Pos: pos,
			Message: fmt.Sprintf("the graduation nearest to %s, %s, gives more than the limit, and the one below, %s, is too far off", s.Volume(v), s.Volume(r.Volume), s.Volume(down)), Remedy: "order less, or a weaker mixture"})
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
		return "dilute first: give concentration and volume as well as the dose, with " + joinOr(diluentNames(w.plan.Presentation.Diluents))
	}
	return "no weaker presentation and no diluent is listed: order a larger amount, or another drug"
}

// settleFinal works the final volume and the barrel that holds it.
func (w *work) settleFinal(t target) bool {
	m := &w.plan.Mixture
	switch m.Method {
	case Neat:
		m.FinalVolume = m.DrugVolume
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
			return w.refuse(refusal.Reason{Code: refusal.VolumeAboveSyringe, Field: "size", Got: s.Volume(m.FinalVolume), Want: "at most " + s.Volume(b.Nominal()), Rule: "R8", Pos: w.o.Size.Pos,
				Message: fmt.Sprintf("%s does not fit into a %s syringe", s.Volume(m.FinalVolume), s.Volume(b.Nominal())), Remedy: "take a larger syringe or order less"})
		case !w.o.Size.Given() && (!fits || w.tooSmallForPump(b)):
			continue
		}
		m.FinalBarrel = b
		return w.onGraduation(b, t)
	}
	if w.o.Size.Given() && w.largest().Cmp(m.FinalVolume) >= 0 {
		return w.refuse(refusal.Reason{Code: refusal.SyringeUnknown, Field: "size", Got: w.o.Size.Text, Want: w.sizes(), Rule: "R8", Pos: w.o.Size.Pos,
			Message: fmt.Sprintf("a %s syringe is not stocked", s.Volume(w.o.Size.Value)), Remedy: "use one of: " + w.sizes()})
	}
	return w.refuse(refusal.Reason{Code: refusal.VolumeAboveSyringe, Field: t.field, Got: s.Volume(m.FinalVolume), Want: "at most " + s.Volume(w.largest()), Rule: "R8", Pos: t.pos,
		Message: fmt.Sprintf("%s does not fit into the largest syringe, %s", s.Volume(m.FinalVolume), s.Volume(w.largest())), Remedy: "order a smaller volume, or a bag (method = \"add to\")"})
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
	return w.refuse(refusal.Reason{Code: refusal.VolumeOffGraduation, Field: "volume", Got: s.Volume(m.FinalVolume), Want: "a multiple of " + s.Volume(b.Step()), Rule: "R8", Pos: t.pos,
		Message: fmt.Sprintf("the %s barrel has no graduation at %s", s.Volume(b.Nominal()), s.Volume(m.FinalVolume)), Remedy: "order " + s.Volume(at) + ", or another syringe size"})
}

// results works amount, concentration, left-over, and the drug's companions.
func (w *work) results() bool {
	m, p := &w.plan.Mixture, w.plan.Presentation
	var err error
	if m.Amount, err = m.DrugVolume.Holds(m.Strength); err != nil {
		return w.fault(err, "amount", w.o.Pos)
	}
	if m.Concentration, err = m.Amount.In(m.FinalVolume); err != nil {
		return w.fault(err, "concentration", w.o.Pos)
	}
	if m.LeftVolume, err = p.Volume.Times(m.Containers).Minus(m.DrugVolume); err != nil {
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
