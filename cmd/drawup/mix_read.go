package main

import (
	"fmt"

	"drawup/dilution"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// sumFault is an error of a sum as a reason; field names the sum.
func sumFault(field string, err error) refusal.Reason {
	if r, ok := err.(refusal.Reason); ok {
		return r
	}
	return faultOf(field, err)
}

// readStrength is --strength; with --drug and without it, the strength of the
// presentation that the formulary has.
func readStrength(r *request) quantity.Concentration {
	if r.given("strength") || !r.given("drug") {
		return read(r, "strength", quantity.ParseConcentration)
	}
	q, f, ok := r.quick(dilution.Quick{Mix: &dilution.QuickMix{Presentation: r.texts["presentation"].text}})
	if !ok {
		return quantity.Concentration{}
	}
	p, reasons := q.Stock(f)
	if reasons.Refused() {
		r.faults = append(r.faults, inFlags(reasons.Refusals())...)
		return quantity.Concentration{}
	}
	c, err := p.Amount.In(p.Volume)
	if err != nil {
		r.add(faultOf("--presentation", err))
	}
	return c
}

// readMakeUp is --amount or --concentration, --final and --strength: the drug
// volume is worked and the syringe made up.
func readMakeUp(r *request) (mixture, error) {
	r.exactlyOne("amount", "concentration", "each")
	r.forbid("they go with --take or --powder", "diluent", "make-up-to", "add-to", "replace-in", "bag-holds", "add", "displacement")
	m := mixture{
		method: methodMakeUp, amount: read(r, "amount", quantity.ParseAmount), volume: readFinal(r), strength: readStrength(r),
	}
	m.readEach(r)
	conc := read(r, "concentration", quantity.ParseConcentration)
	if r.refused() {
		return m, nil
	}
	var err error
	switch {
	case conc.Given():
		m.amount, err = m.volume.Holds(conc)
	case m.each.Given():
		m.amount, err = dilution.WeightMade(m.each, m.weight, m.volume)
	}
	if err != nil {
		return m, err
	}
	if !m.strength.Given() {
		m.method = methodFinal
		return m, nil
	}
	if m.drug, err = m.amount.DrawnAt(m.strength); err != nil {
		return m, err
	}
	return m, m.fill(r)
}

// fill works the diluent of a final volume.
func (m *mixture) fill(r *request) error {
	if m.drug.Cmp(m.volume) > 0 {
		return refusal.Reason{
			Code: refusal.ContradictoryAmounts, Severity: refusal.Refuse, Field: "drug volume", Rule: "R5",
			Got: r.style.Volume(m.drug), Want: "at most " + r.style.Volume(m.volume),
			Message: fmt.Sprintf("the drug alone takes %s, more than the final volume of %s", r.style.Volume(m.drug), r.style.Volume(m.volume)),
			Remedy:  "use a stronger presentation, a larger final volume or less drug",
		}
	}
	if m.drug.Cmp(m.volume) == 0 {
		m.method = methodNeat
	}
	var err error
	m.diluent, err = m.volume.Minus(m.drug)
	return err
}

// readTake is --take and --strength with one of the four ways to dilute.
func readTake(r *request) (mixture, error) {
	if !r.given("drug") {
		r.need("strength", "the amount in what is taken is not known without it")
	}
	r.exactlyOne("diluent", "make-up-to", "add-to", "replace-in")
	r.forbid("--take says how much drug there is", "amount", "concentration", "final", "add", "displacement", "each", "weight", "rule")
	m := mixture{drug: read(r, "take", quantity.ParseVolume), strength: readStrength(r)}
	if r.given("bag-holds") && r.count("add-to", "replace-in") == 0 {
		r.forbid("no bag takes part", "bag-holds")
	}
	diluent, makeUp := read(r, "diluent", quantity.ParseVolume), read(r, "make-up-to", quantity.ParseVolume)
	addTo, replace := read(r, "add-to", quantity.ParseVolume), read(r, "replace-in", quantity.ParseVolume)
	if r.refused() {
		return m, nil
	}
	var err error
	if m.amount, err = m.drug.Holds(m.strength); err != nil {
		return m, err
	}
	switch {
	case diluent.Given():
		m.method, m.diluent = methodAdd, diluent
		m.volume = m.drug.Plus(diluent)
	case addTo.Given():
		m.method, m.bag, m.diluent = methodAddTo, addTo, m.readBag(r, addTo)
		m.volume = m.drug.Plus(m.diluent)
	case makeUp.Given():
		m.method, m.volume = methodMakeUp, makeUp
		return m, m.fill(r)
	case replace.Given():
		m.method, m.bag, m.volume = methodReplace, replace, m.readBag(r, replace)
		err = m.fill(r)
	}
	return m, err
}

// readPowder is --powder with what is added and what the powder displaces, or
// with the volume in the end (rule R7).
func readPowder(r *request) (mixture, error) {
	r.forbid("a powder has no volume to take", "amount", "strength", "take", "diluent", "make-up-to", "add-to", "replace-in",
		"bag-holds", "each", "weight", "rule")
	m := mixture{
		method: methodPowder, amount: read(r, "powder", quantity.ParseAmount), diluent: read(r, "add", quantity.ParseVolume),
		displaced: read(r, "displacement", quantity.ParseVolume), volume: read(r, "final", quantity.ParseVolume),
	}
	conc := read(r, "concentration", quantity.ParseConcentration)
	if r.refused() {
		return m, nil
	}
	if conc.Given() {
		r.atMostOne("concentration", "final")
		r.atMostOne("concentration", "add")
		var err error
		if m.volume, err = m.amount.DrawnAt(conc); err != nil {
			return m, err
		}
	}
	return m, m.closePowder(r)
}

// closePowder finds the third of added, displaced and final volume.
func (m *mixture) closePowder(r *request) error {
	add, displaced, final := m.diluent.Given(), m.displaced.Given(), m.volume.Given()
	var err error
	switch {
	case add && displaced && final:
		if m.diluent.Plus(m.displaced).Cmp(m.volume) != 0 {
			return refusal.Reason{
				Code: refusal.ContradictoryAmounts, Severity: refusal.Refuse, Field: "--final", Rule: "R7",
				Message: fmt.Sprintf("%s added and %s displaced make %s, not %s", r.style.Volume(m.diluent), r.style.Volume(m.displaced),
					r.style.Volume(m.diluent.Plus(m.displaced)), r.style.Volume(m.volume)),
				Remedy: "leave one of the three out",
			}
		}
	case add && displaced:
		m.volume = m.diluent.Plus(m.displaced)
	case final && displaced:
		m.diluent, err = m.rest(r, m.displaced)
	case final && add:
		m.displaced, err = m.rest(r, m.diluent)
	case final && r.given("final"):
	default:
		return refusal.Reason{
			Code: refusal.DisplacementBlank, Severity: refusal.Refuse, Field: "--displacement", Rule: "R7",
			Message: "a powder takes room of its own, and neither that volume nor the volume after mixing is given",
			Remedy:  `add --displacement "0.2 mL" from the record of the powder, or --final "5 mL" if that is what it gives`,
		}
	}
	return err
}

// rest is what the final volume leaves beside part.
func (m *mixture) rest(r *request, part quantity.Volume) (quantity.Volume, error) {
	left, err := m.volume.Minus(part)
	if err != nil {
		return left, refusal.Reason{
			Code: refusal.ContradictoryAmounts, Severity: refusal.Refuse, Field: "--final", Rule: "R7",
			Got: r.style.Volume(m.volume), Want: "at least " + r.style.Volume(part),
			Message: fmt.Sprintf("%s alone is more than the volume after mixing, %s", r.style.Volume(part), r.style.Volume(m.volume)),
			Remedy:  "check the volumes, and the concentration if one is given",
		}
	}
	return left, nil
}
