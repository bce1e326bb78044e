package main

import (
	"errors"
	"fmt"
	"io"
	"math/big"
	"strings"

	"drawup/dilution"
	"drawup/dilution/pump"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// largeLoss is the rounding of a pump rate, in per cent, from which on it is
// told as a caution. Common practice, no source.
const largeLoss = 5

// wantedRungs is how many rungs the ladder of a quick sum aims at.
const wantedRungs = 8

func rateFlags() []flagSpec {
	return append([]flagSpec{
		{"dose", "0.1 microgram/kg/min", "the dose rate wanted; the pump rate is worked"},
		{"rate", "5.3 mL/h", "the pump rate; the dose rate is worked"},
		{"as", "microgram/kg/min", "with --rate: the unit of the dose rate; without it the drug's unit per hour"},
		{"step", "0.1 mL/h", "the pump's step, 0.1 mL/h unless given"},
	}, append(patientAndMixFlags(), limitFlags()...)...)
}

func patientAndMixFlags() []flagSpec {
	return append([]flagSpec{
		{"mix", "4 mg in 50 mL", "amount in FINAL volume"},
		{"concentration", "80 microgram/mL", "concentration in the syringe; per cent and ratio strengths are read too"},
	}, patientFlags()...)
}

// A rungJSON is one step of the ladder.
type rungJSON struct {
	DoseRate  *quantityJSON `json:"dose_rate"`
	FlowRate  *quantityJSON `json:"flow_rate"`
	PumpRate  *quantityJSON `json:"pump_rate"`
	Delivered *quantityJSON `json:"delivered_dose_rate"`
}

// A rateDocument is the answer of drawup rate.
type rateDocument struct {
	DoseRate      *quantityJSON `json:"dose_rate,omitempty"`
	FlowRate      *quantityJSON `json:"flow_rate,omitempty"`
	PumpRate      *quantityJSON `json:"pump_rate,omitempty"`
	Delivered     *quantityJSON `json:"delivered_dose_rate,omitempty"`
	Concentration *quantityJSON `json:"concentration,omitempty"`
	Lost          *quantityJSON `json:"lost,omitempty"` // pump rate minus flow rate, in per cent of it
	Ladder        []rungJSON    `json:"ladder,omitempty"`
	Working       []string      `json:"working,omitempty"`
	patientJSON
	findings
}

// A rateSum is what the flags of drawup rate say.
type rateSum struct {
	dose quantity.DoseRate // wanted, or the unit wanted with --rate
	flow quantity.FlowRate // with --rate
	step quantity.FlowRate
	conc quantity.Concentration
	who  patient
	per  pump.Per
}

func runRate(e env, args []string) int {
	r := newRequest("rate", rateFlags(), args)
	if r.help {
		return showHelp(e, "rate")
	}
	doc := &rateDocument{}
	s := readRate(r)
	if !r.refused() {
		workRate(r, s, doc)
	}
	if r.refused() {
		doc = &rateDocument{}
	}
	return r.finish(e, doc, func(w io.Writer) { tellRate(w, doc, r.given("rate")) })
}

func readRate(r *request) rateSum {
	r.exactlyOne("dose", "rate")
	if r.given("dose") {
		r.forbid("it goes with --rate", "as")
	}
	s := rateSum{
		dose: read(r, "dose", quantity.ParseDoseRate),
		flow: read(r, "rate", quantity.ParseFlowRate),
		step: read(r, "step", quantity.ParseFlowRate),
		conc: readConcentration(r),
	}
	if !r.given("step") {
		s.step = quantity.MillilitresPerHour(big.NewRat(1, 10))
	}
	if r.given("rate") && s.conc.Given() {
		s.dose = readAs(r, s.conc)
	}
	if s.dose.Given() {
		s.who = readPatient(r, s.dose.Basis())
		s.per = s.who.per(s.dose.Basis())
	}
	return s
}

// readConcentration reads --mix or --concentration.
func readConcentration(r *request) quantity.Concentration {
	r.exactlyOne("mix", "concentration")
	if r.given("concentration") {
		return read(r, "concentration", quantity.ParseConcentration)
	}
	return read(r, "mix", func(s string) (quantity.Concentration, error) {
		a, v, err := quantity.ParseMix(s)
		if err != nil {
			return quantity.Concentration{}, err
		}
		return a.In(v)
	})
}

// readAs is one of the dose-rate unit wanted. Without --as it is the drug's
// unit per hour, per kg or m² when a weight or a surface is given.
func readAs(r *request, c quantity.Concentration) quantity.DoseRate {
	if r.given("as") {
		return read(r, "as", func(s string) (quantity.DoseRate, error) { return quantity.ParseDoseRate("1 " + s) })
	}
	unit := c.Unit().String()
	switch {
	case r.given("surface"), r.given("surface-by"):
		unit += "/m2"
	case r.given("weight"):
		unit += "/kg"
	}
	d, err := quantity.ParseDoseRate("1 " + unit + "/h")
	if err != nil {
		r.add(faultOf("--as", err))
	}
	return d
}

func workRate(r *request, s rateSum, doc *rateDocument) {
	if r.given("rate") {
		dose, err := pump.Delivered(s.flow, s.per, s.conc, s.dose)
		if err != nil {
			r.add(faultOf("--rate", err))
			return
		}
		s.dose = dose
	}
	set, err := pump.Set(s.dose, s.per, s.conc, s.step)
	if err != nil {
		r.add(rateFault(r, err))
		return
	}
	if pump.Beyond(set.Rate) {
		r.caution(refusal.Reason{Code: refusal.RateAbovePump, Field: "pump rate", Got: r.style.FlowRate(set.Rate), Want: "a rate that a pump can be set to", Rule: "R8", Source: "common practice, no source",
			Message: "the dose rate needs " + r.style.FlowRate(set.Rate) + ", more than pumps in common use can be set to", Remedy: "check dose, unit and mixture; a stronger mixture runs slower"})
	}
	doc.DoseRate, doc.FlowRate = doseRateJSON(r.style, set.Dose), flowRateJSON(r.style, set.Exact)
	doc.PumpRate, doc.Delivered = flowRateJSON(r.style, set.Rate), doseRateJSON(r.style, set.Delivered)
	doc.Concentration = concentrationJSON(r.style, s.conc)
	doc.Lost = &quantityJSON{exactText(set.LostPercent), signed(r.style, set.LostPercent) + " %", "%"}
	doc.Working = rateWorking(r, s, doc)
	lossCaution(r, set)
	doc.patientJSON = s.who.echo(r.style)
	limits := r.checkLimits(dilution.Quick{Infusion: true, Concentration: s.conc, Rate: set.Dose, Weight: s.who.weight, Surface: s.who.surface})
	if r.given("dose") && !r.refused() {
		ladder(r, s, doc, limits.Top)
	}
}

// rateFault is a fault of setting the pump in words.
func rateFault(r *request, err error) refusal.Reason {
	var below *pump.BelowStep
	if !errors.As(err, &below) {
		return faultOf("--dose", err)
	}
	return refusal.Reason{
		Code: refusal.RateBelowPump, Field: "pump rate", Rule: "R12",
		Got: r.style.FlowRate(below.Exact), Want: "at least half of " + r.style.FlowRate(below.Step),
		Message: fmt.Sprintf("the flow rate of %s is less than half of the pump's step of %s and would be rounded to nothing", r.style.FlowRate(below.Exact), r.style.FlowRate(below.Step)),
		Remedy:  "use a weaker mixture or a pump with a finer step",
	}
}

func lossCaution(r *request, set pump.Setting) {
	size := new(big.Rat).Abs(set.LostPercent)
	if size.Cmp(big.NewRat(largeLoss, 1)) < 0 {
		return
	}
	r.caution(refusal.Reason{
		Code: refusal.RateRounding, Field: "pump rate", Rule: "R2", Source: "common practice, no source: 5 %",
		Got: r.style.Number(size) + " %", Want: fmt.Sprintf("under %d %%", largeLoss),
		Message: fmt.Sprintf("the pump's step changes the rate by %s %%; the patient gets %s", signed(r.style, set.LostPercent), r.style.DoseRate(set.Delivered)),
		Remedy:  "use a weaker mixture or a pump with a finer step",
	})
}

// ladder fills the steps from half to double the dose rate.
func ladder(r *request, s rateSum, doc *rateDocument, top quantity.DoseRate) {
	from, to := s.dose.Scaled(big.NewRat(1, 2)), s.dose.Scaled(big.NewRat(2, 1))
	if above(to, top) {
		to = top
	}
	rungs, err := pump.Ladder(from, to, wantedRungs, s.per, s.conc, s.step)
	if err != nil {
		r.caution(refusal.Reason{
			Code: refusal.RateBelowPump, Field: "ladder", Message: "there is no ladder: " + err.Error(),
			Remedy: "use a weaker mixture or a pump with a finer step",
		})
		return
	}
	for _, x := range rungs {
		if above(x.Delivered, top) {
			continue
		}
		doc.Ladder = append(doc.Ladder, rungJSON{
			DoseRate: doseRateJSON(r.style, x.Dose), FlowRate: flowRateJSON(r.style, x.Exact),
			PumpRate: flowRateJSON(r.style, x.Rate), Delivered: doseRateJSON(r.style, x.Delivered),
		})
	}
}

// above reports that d passes the highest dose rate stored, where one is known
// and counted the same way.
func above(d, top quantity.DoseRate) bool {
	if !top.Given() {
		return false
	}
	n, err := d.Cmp(top)
	return err == nil && n > 0
}

// noLimits says that a quick sum without a drug looks at no limit (rule R10).
func (r *request) noLimits() {
	r.caution(refusal.Reason{
		Code: refusal.LimitsNotChecked, Field: "drug", Rule: "R10",
		Message: "no limit of dose, rate or concentration was checked: no drug is named",
		Remedy:  "compare the result with the formulary before use",
	})
}

// rateWorking says in one or two lines how the rate was got.
func rateWorking(r *request, s rateSum, doc *rateDocument) []string {
	who := s.who.scalar(r.style, s.per.Basis())
	times, over := "", ""
	if who != "" {
		times, over = " x "+who, " ÷ "+who
	}
	if r.given("rate") {
		return []string{
			fmt.Sprintf("%s x %s%s = %s", shown(doc.FlowRate), shown(doc.Concentration), over, shown(doc.DoseRate)),
		}
	}
	return []string{
		fmt.Sprintf("%s%s ÷ %s = %s", shown(doc.DoseRate), times, shown(doc.Concentration), shown(doc.FlowRate)),
		fmt.Sprintf("half up to the pump's step of %s: %s (%s)", r.style.FlowRate(s.step), doc.PumpRate.Printed, doc.Lost.Printed),
	}
}

func tellRate(w io.Writer, d *rateDocument, fromFlow bool) {
	if fromFlow {
		fmt.Fprintf(w, "%s\n", shown(d.DoseRate))
	} else {
		fmt.Fprintf(w, "set the pump to %s\n", d.PumpRate.Printed)
	}
	line(w, "dose rate", shown(d.DoseRate))
	line(w, "flow rate", shown(d.FlowRate))
	line(w, "pump rate", d.PumpRate.Printed+", "+d.Lost.Printed)
	line(w, "dose rate delivered", shown(d.Delivered))
	line(w, "concentration", shown(d.Concentration))
	d.patientJSON.tell(w)
	for _, s := range d.Working {
		line(w, "how", s)
	}
	if len(d.Ladder) == 0 {
		return
	}
	fmt.Fprintf(w, "\n  %s%s   %s\n", pad("dose rate", 26), padLeft("pump rate", 12), "delivered")
	for _, x := range d.Ladder {
		mark := "  "
		if x.DoseRate.Exact == d.DoseRate.Exact {
			mark = "* " // not an arrow: before a number it reads "more than"
		}
		fmt.Fprintf(w, "%s%s%s   %s\n", mark, pad(x.DoseRate.Printed, 26), padLeft(x.PumpRate.Printed, 12), shown(x.Delivered))
	}
	fmt.Fprintln(w)
}

// signed is x with its sign in words that need no mathematics: "1.5 % more".
func signed(s quantity.Style, x *big.Rat) string {
	switch x.Sign() {
	case 0:
		return "0"
	case -1:
		return "-" + strings.TrimPrefix(s.Number(new(big.Rat).Abs(x)), "-")
	}
	return "+" + s.Number(x)
}
