package sheets

import (
	"fmt"
	"strings"

	"drawup/dilution"
	"drawup/dilution/recheck"
	"drawup/labels"
)

// This file says what the planner settled: several sizes of container, what the
// order left open, how long an infusion lasts.

// opened is what to take from the shelf: "2 ampoules, each 4 mg in 4 mL".
func (s scribe) opened() labels.Line {
	if !s.p.Mixture.Mixed() {
		return s.say(s.containers() + s.each() + s.contents())
	}
	var out labels.Line
	for i, pack := range s.p.Mixture.Packs {
		if i > 0 {
			out = joined(out, labels.Words("; "))
		}
		out = joined(out, s.onePack(i, pack))
	}
	if !s.f.Has(recheck.Row(recheck.Pack, 1, "count")) {
		out = joined(out, labels.Words("; how many of each: on the screen and in plan.json"))
	}
	return out
}

// onePack is one size of container, with its count where the second route has a sum
// for it.
func (s scribe) onePack(i int, pack dilution.Pack) labels.Line {
	if count := recheck.Row(recheck.Pack, i+1, "count"); s.f.Has(count) {
		return joined(s.say("{"+count+"} of "), s.said(pack.Presentation.ID))
	}
	return s.said(pack.Presentation.ID)
}

// from is the pattern of what is drawn from.
func (s scribe) from() string {
	if s.p.Mixture.Mixed() {
		var ids []string
		for _, pack := range s.p.Mixture.Packs {
			ids = append(ids, "{="+pack.Presentation.ID+"}")
		}
		return " of " + s.drug() + " from " + strings.Join(ids, " and ") + " ({strength})"
	}
	from := " from " + s.containers() + " of " + s.drug()
	if s.p.Presentation.Powder() {
		return from + " ({strength})"
	}
	return from + ", {container.amount} in {container.volume} ({strength})"
}

// chosen is what the planner took where the order leaves a choice.
func (s scribe) chosen() []Pair {
	var out []Pair
	p := s.p
	if p.FromShelf && !p.Order.Presentation.Given() {
		var ids labels.Line
		for i, pack := range p.Mixture.Packs {
			if i > 0 {
				ids = joined(ids, labels.Words(" and "))
			}
			ids = joined(ids, s.said(pack.Presentation.ID))
		}
		out = append(out, pair("Chosen", joined(ids, labels.Words(": the order names none; why stands on the screen and in plan.json"))))
	}
	if p.Order.Dilute.Value && p.Settled.Concentration.Given() {
		out = append(out, pair("Chosen", s.say("{concentration} in {final.volume}: the neat dose cannot be measured")))
	}
	if p.Infusion != nil && p.Order.Hours.Given() && !p.Order.Standard.Given() && p.Settled.Standard.Given() {
		out = append(out, pair("Chosen", joined(labels.Words("standard preparation "), s.said(p.Settled.Standard.Value), labels.Words(": of those that last it holds least drug"))))
	}
	return out
}

// doses says how many doses the syringe holds.
func (s scribe) doses() labels.Line {
	if s.p.Order.Doses.Value == 1 {
		return labels.Words("the whole syringe is one dose")
	}
	if s.f.Has(recheck.DoseCount) {
		return s.say("enough for {dose.count} doses")
	}
	return s.said(fmt.Sprintf("enough for %s doses", s.p.Order.Doses.Text))
}

// lasts says how long an infusion lasts where the order asks for it, or where
// something of it never reaches the patient.
func (s scribe) lasts() labels.Line {
	part := s.p.Infusion
	var out labels.Line
	switch {
	case part.Wanted > 0:
		out = s.said(fmt.Sprintf("at least %s at the start rate", s.p.Order.Hours.Text))
	case s.f.Has(recheck.UsableTime):
		out = s.say("{usable.time} at the start rate")
	default:
		out = labels.Words("less than its volume at the start rate")
	}
	switch {
	case !part.CountsOff():
		return out
	case part.Priming.Given() && part.DeadSpace.Given():
		return joined(out, s.said(fmt.Sprintf(", %s to fill the line and %s that stay behind counted off",
			s.p.Style.Volume(part.Priming), s.p.Style.Volume(part.DeadSpace))))
	case part.Priming.Given():
		return joined(out, s.said(fmt.Sprintf(", %s to fill the line counted off", s.p.Style.Volume(part.Priming))))
	}
	return joined(out, s.said(fmt.Sprintf(", %s that stay behind counted off", s.p.Style.Volume(part.DeadSpace))))
}

// empty is when the pump has run dry: a time where the second route has a sum
// for it.
func (s scribe) empty() Pair {
	if s.f.Has(recheck.EmptyAt) {
		run := "{run.time}"
		if s.f.Has(recheck.UsableTime) {
			run = "{usable.time}"
		}
		return pair("Empty", s.say("{empty.at}, if started {prepared} at this rate ("+run+")"))
	}
	return pair("Lasts", s.lasts())
}

// oneWeight says what 1 mL/h of a mixture for one weight gives.
func (s scribe) oneWeight() labels.Line {
	part := s.p.Infusion
	if part == nil || !part.Each.Given() {
		return nil
	}
	// One sentence with its words: bare, the figure would pass for one of the record.
	return joined(s.said(s.p.Order.Mixture.Text), s.say(" for {rate.weight} and no other weight: "), s.said("each mL/h gives "+s.p.Settled.Each.Text))
}

// diluentFrom is the containers of diluent on the shelf: ", from ampoules of 10
// mL"; nothing without a shelf that lists them.
func (s scribe) diluentFrom(powder bool) labels.Line {
	var out labels.Line
	for _, f := range s.p.Mixture.Fluids {
		if f.ForPowder != powder || f.Container == "bag" && s.bag() {
			continue
		}
		word := ", from one " + f.Container
		if len(out) > 0 {
			word = " and one " + f.Container
		}
		if f.Count > 1 {
			word = strings.Replace(word, "one "+f.Container, f.Container+"s", 1)
		}
		out = joined(out, labels.Words(word+" of "), s.said(s.p.Style.Volume(f.Volume)))
	}
	return out
}

// supplied is one container as supplied, or that there are several sizes.
func (s scribe) supplied() labels.Line {
	if s.p.Mixture.Mixed() {
		return joined(labels.Words("several sizes of container, all "), s.say("{strength}"))
	}
	return s.say(s.container())
}

// likeTheRest says that all sizes of container have the one strength.
func (s scribe) likeTheRest() string {
	if s.p.Mixture.Mixed() {
		return ", and so is every other container that is opened"
	}
	return ""
}

// counted is how many containers the drug volume takes.
func (s scribe) counted() labels.Line {
	if !s.p.Mixture.Mixed() {
		return s.say("containers: {drug.volume} out of {container.volume} each takes {container.count}")
	}
	return joined(s.say("containers: {drug.volume} takes "), s.opened())
}

// balance is what was taken and where it went (rule R6).
func (s scribe) balance() labels.Line {
	switch {
	case !s.p.Mixture.Mixed():
		return s.say("balance: {container.count} of {container.amount} taken; {amount} in it and {left.amount} ({left.volume}) left over")
	case s.f.Has(recheck.LeftAmount):
		return s.say("balance: {amount} in it and {left.amount} ({left.volume}) left over in one of {container.count} containers")
	}
	return s.say("balance: {amount} in it; what is left over in the last container stands in plan.json")
}
