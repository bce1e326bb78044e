package main

import (
	"fmt"
	"io"

	"drawup/dilution"
	"drawup/dilution/quantity"
)

func doseFlags() []flagSpec {
	return append([]flagSpec{
		{"dose", "0.3 mg/kg", "the dose: absolute, per kg or per m²"},
	}, append(patientAndMixFlags(), limitFlags()...)...)
}

// A doseDocument is the answer of drawup dose. Reading is what a stocked barrel
// shows; it is left out when none measures the volume.
type doseDocument struct {
	Amount        *quantityJSON `json:"amount,omitempty"`
	Volume        *quantityJSON `json:"volume,omitempty"`
	Concentration *quantityJSON `json:"concentration,omitempty"`
	Reading       *readingJSON  `json:"reading,omitempty"`
	Working       []string      `json:"working,omitempty"`
	patientJSON
	findings
}

func runDose(e env, args []string) int {
	r := newRequest("dose", doseFlags(), args)
	if r.help {
		return showHelp(e, "dose")
	}
	doc := &doseDocument{}
	r.need("dose", "there is no sum without it")
	dose := read(r, "dose", quantity.ParseDose)
	conc := readConcentration(r)
	var who patient
	if dose.Given() {
		who = readPatient(r, dose.Basis())
	}
	if !r.refused() {
		workDose(r, dose, conc, who, doc)
	}
	if r.refused() {
		doc = &doseDocument{}
	}
	return r.finish(e, doc, func(w io.Writer) { tellDose(w, doc) })
}

func workDose(r *request, dose quantity.Dose, c quantity.Concentration, who patient, doc *doseDocument) {
	amount, err := who.amount(dose)
	if err != nil {
		r.add(faultOf("--dose", err))
		return
	}
	volume, err := amount.DrawnAt(c)
	if err != nil {
		r.add(faultOf("--dose", err))
		return
	}
	doc.Amount, doc.Volume, doc.Concentration = amountJSON(r.style, amount), volumeJSON(r.style, volume), concentrationJSON(r.style, c)
	if by := who.scalar(r.style, dose.Basis()); by != "" {
		doc.Working = append(doc.Working, fmt.Sprintf("%s x %s = %s", r.style.Dose(dose), by, shown(doc.Amount)))
	}
	doc.Working = append(doc.Working, fmt.Sprintf("%s ÷ %s = %s", shown(doc.Amount), shown(doc.Concentration), shown(doc.Volume)))
	doc.patientJSON = who.echo(r.style)
	r.checkLimits(dilution.Quick{Concentration: c, Dose: dose, Weight: who.weight, Surface: who.surface})
	if got, ok := r.measure("volume", volume, r.given("drug") && !r.refused()); ok {
		doc.Reading = readingOf(r.style, got)
	}
}

func tellDose(w io.Writer, d *doseDocument) {
	if d.Reading != nil {
		fmt.Fprintf(w, "give %s\n", shown(d.Volume))
	} else {
		fmt.Fprintf(w, "%s: %s\n", shown(d.Volume), notMeasured)
	}
	line(w, "amount", shown(d.Amount))
	line(w, "concentration", shown(d.Concentration))
	d.patientJSON.tell(w)
	if d.Reading != nil {
		line(w, "measured", d.Reading.words())
	}
	for _, s := range d.Working {
		line(w, "how", s)
	}
}
