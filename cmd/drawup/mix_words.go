package main

import (
	"fmt"
	"io"
	"strings"

	"drawup/dilution/refusal"
)

// mixCautions tells what the sum does not show by itself.
func mixCautions(r *request, m mixture) {
	switch {
	case m.measured.Given(): // both figures are told
	case m.method == methodAddTo:
		bagCaution(r, m, "the drug's own volume is counted; the bag as labelled alone would give")
	case m.method == methodReplace:
		r.caution(refusal.Reason{
			Code: refusal.BagFillUnknown, Field: "--replace-in", Rule: "R9", Got: r.style.Volume(m.bag),
			Message: "the bag is taken to hold " + r.style.Volume(m.bag) + "; what it really holds is not known and is not in the interval",
			Remedy:  "measure the fluid instead where the concentration matters",
		})
	case m.method == methodFinal:
		r.caution(refusal.Reason{
			Code: refusal.FlagMissing, Field: "--strength",
			Message: "no strength is given: what to draw and what to add are not worked, and there is no interval",
			Remedy:  r.remedyFor("strength"),
		})
	}
}

// bagCaution names both figures of a bag that grows (rule R5).
func bagCaution(r *request, m mixture, words string) {
	nominal, err := m.amount.In(m.bag)
	if err != nil {
		r.add(faultOf("--add-to", err))
		return
	}
	r.caution(refusal.Reason{
		Code: refusal.BagFillUnknown, Field: "--add-to", Rule: "R5",
		Got: r.style.Concentration(m.conc), Want: r.style.Concentration(nominal),
		Message: fmt.Sprintf("%s: %s %s; this sum gives %s. What the bag really holds is not known and is not in the interval",
			r.style.Volume(m.bag), words, r.style.Concentration(nominal), r.style.Concentration(m.conc)),
		Remedy: "label the mixture with the figure that the order means, and say which it is; or use --replace-in or --make-up-to",
	})
}

// mixWorking says in one or two lines how the figures were got.
func mixWorking(r *request, m mixture, d *mixDocument) []string {
	final := fmt.Sprintf("%s ÷ %s = %s", shown(d.Amount), shown(d.FinalVolume), shown(d.Concentration))
	strength := ""
	if m.strength.Given() {
		strength = shown(concentrationJSON(r.style, m.strength))
	}
	switch {
	case m.method == methodPowder && d.Displacement != nil:
		return []string{fmt.Sprintf("%s added + %s displaced = %s", shown(d.DiluentVolume), shown(d.Displacement), shown(d.FinalVolume)), final}
	case m.method == methodPowder, m.method == methodFinal:
		return []string{final}
	case r.given("take"):
		return []string{fmt.Sprintf("%s x %s = %s", shown(d.DrugVolume), strength, shown(d.Amount)), final}
	}
	return []string{fmt.Sprintf("%s ÷ %s = %s", shown(d.Amount), strength, shown(d.DrugVolume)), final}
}

// act is what to do, in one line, for each method.
func (d *mixDocument) act() string {
	drug := ""
	if d.DrugVolume != nil {
		drug = shown(d.DrugVolume)
		if d.DrugReading == nil {
			drug += " (" + notMeasured + ")"
		}
	}
	switch d.Method {
	case methodNeat:
		return fmt.Sprintf("draw %s, add nothing", drug)
	case methodMakeUp:
		return fmt.Sprintf("draw %s of drug, make up to %s with diluent (%s)", drug, shown(d.FinalVolume), shown(d.DiluentVolume))
	case methodAdd:
		return fmt.Sprintf("draw %s of drug, add %s of diluent", drug, shown(d.DiluentVolume))
	case methodAddTo:
		return fmt.Sprintf("add %s of drug to the %s in the bag: %s", drug, shown(d.DiluentVolume), shown(d.FinalVolume))
	case methodReplace:
		return fmt.Sprintf("withdraw %s from the bag (%s stays), then add %s of drug", shown(d.DrugVolume), shown(d.DiluentVolume), drug)
	case methodPowder:
		if d.DiluentVolume == nil {
			return fmt.Sprintf("mix the powder to %s", shown(d.FinalVolume))
		}
		return fmt.Sprintf("add %s to the powder: %s", shown(d.DiluentVolume), shown(d.FinalVolume))
	case methodFinal:
		return fmt.Sprintf("%s in %s", shown(d.Amount), shown(d.FinalVolume))
	}
	return ""
}

func tellMix(w io.Writer, d *mixDocument) {
	fmt.Fprintf(w, "%s\n%s\n", shown(d.Concentration), d.act())
	for _, row := range []struct {
		name string
		q    *quantityJSON
	}{
		{"amount", d.Amount}, {"drug volume", d.DrugVolume}, {"displaced by powder", d.Displacement},
		{"diluent volume", d.DiluentVolume}, {"final volume", d.FinalVolume},
	} {
		if row.q != nil {
			line(w, row.name, shown(row.q))
		}
	}
	if d.DrugReading != nil {
		line(w, "drug measured", d.DrugReading.words())
	}
	if d.Interval != nil {
		line(w, "interval", fmt.Sprintf("%s to %s, %s either way; %s at the worst", d.Interval.Low.Printed, d.Interval.High.Printed,
			d.Interval.Percent.Printed, d.Interval.Worst.Printed))
		line(w, "interval covers", d.Interval.Covers)
	}
	if len(d.Presentations) > 0 {
		line(w, "drawn from", d.stock())
	}
	d.bagJSON.tell(w)
	d.weightMadeJSON.tell(w)
	d.patientJSON.tell(w)
	for _, s := range d.Working {
		line(w, "how", s)
	}
}

// stock is what has to be fetched.
func (d *mixDocument) stock() string {
	s := strings.Join(d.Presentations, ", or ")
	if d.Containers > 0 {
		s = fmt.Sprintf("%d x %s", d.Containers, s)
	}
	if d.Diluent != "" {
		s += "; diluted with " + d.Diluent
	}
	return s
}
