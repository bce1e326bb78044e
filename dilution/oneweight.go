package dilution

import (
	"fmt"

	"drawup/dilution/order"
	"drawup/dilution/pump"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// ruleSource is where the rules of mixtures for one weight are written down, and
// why standard concentrations are preferred.
const ruleSource = "ISMP Medication Safety Alert 2005;10(4), rule of six"

// eachOf is the dose rate that 1 mL/h of a mixture for one weight gives when the
// order does not say (calculation.md part h).
const eachOf = "1 microgram/kg/min"

// volumeOfRule is the volume that a rule is published for.
func volumeOfRule(rule string) string {
	if rule == order.RuleOfSix {
		return "100 mL"
	}
	return "50 mL"
}

// weightMade is a mixture made for one weight: so strong that each 1 mL/h gives
// the dose rate of the rule.
func (w *work) weightMade() (target, bool) {
	o := w.o
	t := target{field: "mixture", pos: o.Mixture.Pos}
	part, ok := w.startPart()
	if !ok {
		return t, false
	}
	each := o.Each.Value
	var err error
	if !each.Given() {
		if each, err = quantity.ParseDoseRate(eachOf); err != nil {
			return t, w.fault(err, "mixture", o.Mixture.Pos)
		}
	}
	if t.volume = o.Volume.Value; !t.volume.Given() {
		if t.volume, err = quantity.ParseVolume(volumeOfRule(o.Mixture.Value)); err != nil {
			return t, w.fault(err, "mixture", o.Mixture.Pos)
		}
		w.o.Volume = order.Field[quantity.Volume]{Value: t.volume, Text: t.volume.Written(), Pos: o.Mixture.Pos}
	}
	if each.Basis() != quantity.PerKilogram || !part.Weight.Given() {
		return t, w.refuse(refusal.Reason{
			Code: refusal.UnitWrongKind, Field: "mixture", Got: w.plan.Style.DoseRate(each) + " and a start of " + w.plan.Style.DoseRate(o.Start.Value),
			Want: "dose rates per kg", Rule: "R3", Pos: o.Mixture.Pos, Source: ruleSource,
			Message: "a mixture for one weight goes by dose rates per kg, and one of the two is not",
			Remedy:  `write mix = "… in …" in place of the rule`,
		})
	}
	if t.amount, err = WeightMade(each, part.Weight, t.volume); err != nil {
		return t, w.fault(err, "mixture", o.Mixture.Pos)
	}
	w.o.Each = order.Field[quantity.DoseRate]{Value: each, Text: each.Written(), Pos: o.Mixture.Pos}
	return t, w.ruleHolds(t, each, part)
}

// ruleHolds checks at run time that 1 mL/h of the mixture gives what the rule
// says, by the sum of the pump, which goes the other way.
func (w *work) ruleHolds(t target, each quantity.DoseRate, part InfusionPart) bool {
	c, err := t.amount.In(t.volume)
	if err != nil {
		return w.fault(err, "mixture", t.pos)
	}
	flow, err := pump.Flow(each, part.per(), c)
	if err == nil && flow.Rat().Cmp(one()) == 0 {
		return true
	}
	return w.refuse(refusal.Reason{
		Code: refusal.RoutesDisagree, Field: "mixture", Rule: "R6", Pos: t.pos,
		Message: "the mixture for one weight does not give what its rule says: a fault of this program, not of yours",
		Remedy:  "do not use this result; report it",
	})
}

// oneWeight cautions that the syringe fits one weight, and names the standard
// preparation that is nearest.
func (w *work) oneWeight(part *InfusionPart) {
	if !w.o.Mixture.Given() {
		return
	}
	part.Each = w.o.Each.Value
	if a, err := WeightMade(part.Each, part.Weight, w.o.Volume.Value); err == nil {
		part.RuleAmount = a
	}
	s := w.plan.Style
	near := "the formulary lists no standard preparation to use in its place"
	if st, _, ok := NearestStandard(w.plan.Drug, w.plan.Mixture.Concentration, w.line()); ok {
		near = fmt.Sprintf("the nearest standard preparation is %q", st.ID)
	}
	w.caution(refusal.Reason{
		Code: refusal.MadeForOneWeight, Field: "mixture", Got: w.o.Mixture.Text, Want: "a standard preparation", Rule: "R10", Source: ruleSource, Pos: w.o.Mixture.Pos,
		Message: fmt.Sprintf("this syringe is made for %s and fits no other patient; %s", s.BodyWeight(part.Weight), near),
		Remedy:  "take a standard preparation where there is one",
	})
}
