package main

import (
	"fmt"
	"io"
	"math/big"
	"strings"

	"drawup/dilution"
	"drawup/dilution/pump"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// A weightMadeJSON is what a mixture for one weight adds to the answer.
type weightMadeJSON struct {
	Each    *quantityJSON `json:"each,omitempty"` // what each 1 mL/h gives
	Nearest *standardJSON `json:"nearest_standard,omitempty"`
}

// A standardJSON is a standard preparation beside the mixture.
type standardJSON struct {
	ID            string        `json:"id"`
	Concentration *quantityJSON `json:"concentration"`
	FlowRate      *quantityJSON `json:"flow_rate"` // that gives each with it
	Patients      string        `json:"patients"`  // whom its list is for, "" when it does not say
	Line          string        `json:"line"`
	Jurisdiction  string        `json:"jurisdiction"`
	Source        string        `json:"source"`
}

// whose is whom and what the standard is for, in words.
func (s *standardJSON) whose() string {
	var out []string
	for _, x := range []string{s.Patients, s.Jurisdiction} {
		if x != "" {
			out = append(out, x)
		}
	}
	if s.Line != "any" && s.Line != "" {
		out = append(out, s.Line+" line")
	}
	return strings.Join(out, ", ")
}

// readFinal is --final, or the volume of the rule that is named.
func readFinal(r *request) quantity.Volume {
	if !r.given("each") {
		r.forbid("they go with --each", "weight", "rule")
		r.need("final", "an amount or a concentration needs the final volume")
		return read(r, "final", quantity.ParseVolume)
	}
	r.exactlyOne("final", "rule")
	if !r.given("rule") {
		return read(r, "final", quantity.ParseVolume)
	}
	switch r.texts["rule"].text {
	case "three":
		return quantity.Millilitres(big.NewRat(50, 1))
	case "six":
		return quantity.Millilitres(big.NewRat(100, 1))
	}
	r.add(refusal.Reason{
		Code: refusal.ValueUnknown, Field: "--rule", Got: r.texts["rule"].text, Want: "three or six",
		Message: "--rule: got " + r.texts["rule"].text + ", want three (50 mL) or six (100 mL)",
		Remedy:  `write one of the two, or another volume: --final "20 mL"`,
	})
	return quantity.Volume{}
}

// readEach is --each and the weight that it is for.
func (m *mixture) readEach(r *request) {
	if !r.given("each") {
		return
	}
	m.each, m.weight = read(r, "each", quantity.ParseDoseRate), readWeight(r)
	r.need("weight", "the mixture is for one weight")
	if m.each.Given() && m.each.Basis() != quantity.PerKilogram {
		r.add(refusal.Reason{
			Code: refusal.UnitWrongKind, Field: "--each", Got: r.texts["each"].text, Want: "a dose rate per kg", Rule: "R3",
			Message: "--each: got a dose rate that is " + m.each.Basis().String() + ", want one that is per kg",
			Remedy:  "a mixture that goes by no weight is --concentration with --final",
		})
	}
}

// tellEach writes the caution that belongs to a mixture for one weight, and the
// standard preparation beside it.
func (m mixture) tellEach(r *request, d *mixDocument, limits dilution.QuickLimits) {
	if !m.each.Given() {
		return
	}
	if r.refused() {
		m.pointToStandard(r, d, limits)
		return
	}
	d.Each, d.patientJSON = doseRateJSON(r.style, m.each), patient{weight: m.weight}.echo(r.style)
	words := "this syringe fits a patient of " + shown(d.Weight) + " and nobody else: its strength is its own and stands in no list"
	if r.given("drug") {
		words += "; " + m.beside(r, d, limits)
	}
	r.caution(refusal.Reason{
		Code: refusal.OneWeightOnly, Field: "--each", Rule: "R10", Got: shown(d.Concentration),
		Source:  "Institute for Safe Medication Practices, Medication Safety Alert 2005;10(4)",
		Message: words, Remedy: "use a standard preparation; write the patient's weight on the label of this one",
	})
}

// pointToStandard adds the nearest standard preparation to the remedy of a
// concentration that is refused.
func (m mixture) pointToStandard(r *request, d *mixDocument, limits dilution.QuickLimits) {
	for i, x := range r.faults {
		if x.Code == refusal.ConcentrationTooHigh || x.Code == refusal.ConcentrationTooLow {
			r.faults[i].Remedy += "; " + m.beside(r, d, limits)
		}
	}
}

// beside fills in the nearest standard preparation and says it in words.
func (m mixture) beside(r *request, d *mixDocument, limits dilution.QuickLimits) string {
	line := r.texts["line"].text
	s, c, ok := dilution.NearestStandard(limits.Drug, m.conc, line)
	if !ok {
		return "no standard preparation of " + limits.Drug.Name + " is on record for it"
	}
	flow, err := pump.Flow(m.each, pump.PerWeight(m.weight), c)
	if err != nil {
		r.add(faultOf("--each", err))
		return ""
	}
	source := s.Source.Title
	if s.Unverified {
		source += " (unverified)"
	}
	d.Nearest = &standardJSON{
		s.ID, concentrationJSON(r.style, c), flowRateJSON(r.style, flow), s.Patients, s.Line, s.Jurisdiction, source,
	}
	return fmt.Sprintf("the nearest standard preparation, %s (%s; %s), gives the same at %s",
		s.ID, shown(d.Nearest.Concentration), d.Nearest.whose(), shown(d.Nearest.FlowRate))
}

// tell writes what each 1 mL/h gives, and the standard beside it.
func (x *weightMadeJSON) tell(w io.Writer) {
	if x.Each == nil {
		return
	}
	line(w, "each 1 mL/h gives", shown(x.Each))
	if x.Nearest != nil {
		line(w, "nearest standard", fmt.Sprintf("%s, %s; the same dose at %s (%s)", x.Nearest.ID, shown(x.Nearest.Concentration),
			shown(x.Nearest.FlowRate), x.Nearest.whose()))
	}
}
