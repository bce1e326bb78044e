package main

import (
	"fmt"
	"io"

	"drawup/dilution"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

func totalFlags() []flagSpec {
	return append([]flagSpec{
		{"rate", "0.375 microgram/kg/min", "the dose rate"},
		{"time", "24 h", "how long it runs"},
		{"load", "0.05 mg/kg", "a dose given first, counted in with it"},
		{"mix", "4 mg in 50 mL", "amount in FINAL volume, for the volume that is used up"},
		{"concentration", "80 microgram/mL", "concentration, in place of --mix"},
	}, append(patientFlags(), limitFlags()...)...)
}

// A totalDocument is the answer of drawup total. Infused and total are counted
// per what the rate is; amount is for this patient.
type totalDocument struct {
	Infused       *quantityJSON `json:"infused,omitempty"`
	Load          *quantityJSON `json:"load,omitempty"`
	Total         *quantityJSON `json:"total,omitempty"`
	Amount        *quantityJSON `json:"amount,omitempty"`
	Volume        *quantityJSON `json:"volume,omitempty"`
	Duration      *quantityJSON `json:"duration,omitempty"`
	Concentration *quantityJSON `json:"concentration,omitempty"`
	Working       []string      `json:"working,omitempty"`
	patientJSON
	findings
	span string
}

// A totalSum is what the flags of drawup total say.
type totalSum struct {
	rate quantity.DoseRate
	time quantity.Duration
	load quantity.Dose
	conc quantity.Concentration
	who  patient
}

func runTotal(e env, args []string) int {
	r := newRequest("total", totalFlags(), args)
	if r.help {
		return showHelp(e, "total")
	}
	doc := &totalDocument{}
	s := readTotal(r)
	if !r.refused() {
		if err := s.work(r, doc); err != nil {
			r.add(sumFault("total", err))
		}
	}
	s.limits(r)
	if r.refused() {
		doc = &totalDocument{}
	}
	return r.finish(e, doc, func(w io.Writer) { tellTotal(w, doc) })
}

func readTotal(r *request) totalSum {
	r.need("rate", "there is no sum without it")
	r.need("time", "there is no sum without it")
	s := totalSum{
		rate: read(r, "rate", quantity.ParseDoseRate), time: read(r, "time", quantity.ParseDuration),
		load: read(r, "load", quantity.ParseDose),
	}
	if r.count("mix", "concentration") > 0 {
		s.conc = readConcentration(r)
	}
	if !s.rate.Given() {
		return s
	}
	basis := s.rate.Basis()
	alone := r.count("weight", "surface", "surface-by", "height") == 0
	unlike := s.load.Given() && s.load.Basis() != basis
	switch {
	case alone && basis != quantity.Absolute && !s.conc.Given() && !unlike:
		return s // the total is counted per kg or per m², as the rate is
	case unlike && basis == quantity.Absolute:
		basis = s.load.Basis()
	case unlike && s.load.Basis() != quantity.Absolute:
		r.add(refusal.Reason{
			Code: refusal.UnitWrongKind, Field: "--load", Rule: "R3", Got: s.load.Basis().String(), Want: basis.String(),
			Message: fmt.Sprintf("the load is %v and the rate is %v: the two do not add up", s.load.Basis(), basis),
			Remedy:  "give both counted alike",
		})
		return s
	}
	s.who = readPatient(r, basis)
	return s
}

// limits holds rate, first dose, total and time against the formulary.
func (s totalSum) limits(r *request) {
	if r.refused() {
		return
	}
	q := dilution.Quick{
		Infusion: true, Concentration: s.conc, Rate: s.rate, Weight: s.who.weight, Surface: s.who.surface,
		Run: &dilution.QuickRun{Time: s.time, First: s.load},
	}
	r.checkLimits(q)
	if !r.given("drug") || !s.load.Given() || r.refused() {
		return
	}
	q.Infusion, q.Rate, q.Run, q.Concentration, q.Dose = false, quantity.DoseRate{}, nil, quantity.Concentration{}, s.load
	q, f, ok := r.quick(q)
	if !ok {
		return
	}
	reasons, _ := q.Check(f) // the note on what was checked stands already
	r.faults = append(r.faults, inFlags(reasons)...)
}

func (s totalSum) work(r *request, d *totalDocument) error {
	infused, err := s.rate.During(s.time)
	if err != nil {
		return err
	}
	d.Infused, d.Duration = doseJSON(r.style, infused), durationJSON(r.style, s.time)
	how := func(format string, args ...any) { d.Working = append(d.Working, fmt.Sprintf(format, args...)) }
	d.span = shownSpan(r.style, s.time)
	how("%s x %s = %s", r.style.DoseRate(s.rate), d.span, shown(d.Infused))
	d.patientJSON = s.who.echo(r.style)
	total := infused
	if s.load.Given() {
		d.Load = doseJSON(r.style, s.load)
	}
	switch {
	case s.load.Given() && s.load.Basis() == infused.Basis():
		if total, err = s.load.Plus(infused); err != nil {
			return err
		}
		how("%s first and %s = %s", d.Load.Printed, shown(d.Infused), shown(doseJSON(r.style, total)))
	case s.load.Given():
		return s.joinUnlike(r, d, infused, how)
	}
	d.Total = doseJSON(r.style, total)
	return s.forPatient(r, d, total, how)
}

// joinUnlike adds a load and an infusion of which one is per kg or per m² and the
// other absolute, as amounts for this patient.
func (s totalSum) joinUnlike(r *request, d *totalDocument, infused quantity.Dose, how func(string, ...any)) error {
	first, err := s.who.amount(s.load)
	if err != nil {
		return err
	}
	then, err := s.who.amount(infused)
	if err != nil {
		return err
	}
	sum, err := first.Plus(then)
	if err != nil {
		return err
	}
	how("%s first and %s = %s, for this patient", shown(amountJSON(r.style, first)), shown(amountJSON(r.style, then)), shown(amountJSON(r.style, sum)))
	d.Total = amountJSON(r.style, sum)
	return s.volume(r, d, sum, how)
}

// forPatient is the total as an amount, where there is a patient to it.
func (s totalSum) forPatient(r *request, d *totalDocument, total quantity.Dose, how func(string, ...any)) error {
	if total.Basis() != quantity.Absolute && !s.who.weight.Given() && !s.who.surface.Given() {
		return nil
	}
	amount, err := s.who.amount(total)
	if err != nil {
		return err
	}
	if by := s.who.scalar(r.style, total.Basis()); by != "" {
		how("%s x %s = %s", shown(d.Total), by, shown(amountJSON(r.style, amount)))
	} else {
		d.Total = amountJSON(r.style, amount) // in the unit that suits it
	}
	return s.volume(r, d, amount, how)
}

// volume is what holds the amount at the concentration, if one is given.
func (s totalSum) volume(r *request, d *totalDocument, amount quantity.Amount, how func(string, ...any)) error {
	d.Amount = amountJSON(r.style, amount)
	if !s.conc.Given() {
		return nil
	}
	v, err := amount.DrawnAt(s.conc)
	if err != nil {
		return err
	}
	d.Volume, d.Concentration = volumeJSON(r.style, v), concentrationJSON(r.style, s.conc)
	how("%s ÷ %s = %s", shown(d.Amount), shown(d.Concentration), shown(d.Volume))
	return nil
}

func tellTotal(w io.Writer, d *totalDocument) {
	fmt.Fprintf(w, "%s in all\n", shown(d.Total))
	for _, row := range []struct {
		name string
		q    *quantityJSON
	}{
		{"first", d.Load}, {"infused", d.Infused}, {"amount", d.Amount}, {"volume used up", d.Volume},
		{"concentration", d.Concentration},
	} {
		if row.q != nil {
			line(w, row.name, shown(row.q))
		}
	}
	line(w, "time", d.span)
	d.patientJSON.tell(w)
	for _, s := range d.Working {
		line(w, "how", s)
	}
}
