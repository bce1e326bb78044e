package main

import (
	"fmt"
	"io"
	"math/big"
	"strings"

	"drawup/dilution/pump"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

func flowFlags() []flagSpec {
	return []flagSpec{
		{"volume", "750 mL", "volume to give; with --time the flow rate is worked"},
		{"time", "6 h", "time to give it in; with a rate the volume is worked"},
		{"rate", "125 mL/h", `flow rate; with --volume the time is worked; "2 mL/kg/h" with --weight is read too`},
		{"drops", "42 drops/min", "drop rate counted by eye, in place of --rate; with --set"},
		{"set", "20 drops/mL", "drops that make one mL, printed on the giving set"},
		{"weight", "72 kg", "body weight, where the rate is per kg"},
		{"behind", "2 mL", "part of --volume that stays in syringe and line and is not given"},
		{"step", "0.1 mL/h", "the pump's step, 0.1 mL/h unless given"},
	}
}

// A flowDocument is the answer of drawup flow.
type flowDocument struct {
	Volume    *quantityJSON `json:"volume,omitempty"`
	Behind    *quantityJSON `json:"left_behind,omitempty"`
	Usable    *quantityJSON `json:"usable_volume,omitempty"` // with left_behind: what is given
	Duration  *quantityJSON `json:"duration,omitempty"`      // printed rounded down
	FlowRate  *quantityJSON `json:"flow_rate,omitempty"`
	PumpRate  *quantityJSON `json:"pump_rate,omitempty"` // flow rate half up to the pump's step
	Lost      *quantityJSON `json:"lost,omitempty"`      // pump rate minus flow rate, in per cent of it
	DropRate  *quantityJSON `json:"drop_rate,omitempty"`
	Counted   *quantityJSON `json:"drops_counted,omitempty"` // drop rate half up to whole drops
	Delivered *quantityJSON `json:"delivered_flow_rate,omitempty"`
	Working   []string      `json:"working,omitempty"`
	patientJSON
	findings
	headline, span string
}

// A flowSum is what the flags of drawup flow say, and what is worked from them.
type flowSum struct {
	volume, behind, usable quantity.Volume
	time                   quantity.Duration
	rate                   quantity.FlowRate
	perKg                  quantity.FlowPerKilogram
	weight                 quantity.BodyWeight
	set                    quantity.DropFactor
	drops                  quantity.DropRate
	step                   quantity.FlowRate
}

func runFlow(e env, args []string) int {
	r := newRequest("flow", flowFlags(), args)
	if r.help {
		return showHelp(e, "flow")
	}
	doc := &flowDocument{}
	s := readFlow(r)
	if !r.refused() {
		if err := s.work(r, doc); err != nil {
			r.add(sumFault("flow", err))
		}
	}
	if r.refused() {
		doc = &flowDocument{}
	}
	return r.finish(e, doc, func(w io.Writer) { tellFlow(w, doc) })
}

func readFlow(r *request) flowSum {
	s := flowSum{
		volume: read(r, "volume", quantity.ParseVolume), behind: read(r, "behind", quantity.ParseVolume),
		time: read(r, "time", quantity.ParseDuration), weight: readWeight(r), set: read(r, "set", quantity.ParseDropFactor),
		drops: read(r, "drops", quantity.ParseDropRate), step: read(r, "step", quantity.ParseFlowRate),
	}
	if !r.given("step") {
		s.step = quantity.MillilitresPerHour(big.NewRat(1, 10))
	}
	s.checkSet(r)
	s.readRate(r)
	switch {
	case r.broken:
	case r.given("volume") && r.given("time"):
		r.forbid("volume and time give the rate", "rate", "drops")
	case r.count("rate", "drops") == 0:
		r.add(refusal.Reason{
			Code: refusal.FlagMissing, Field: "--rate", Want: "two of volume, time and rate",
			Message: "two of volume, time and rate give the third; there are fewer",
			Remedy:  `add two of --volume "750 mL", --time "6 h" and --rate "125 mL/h"`,
		})
	case r.count("volume", "time", "set", "weight", "drops") == 0:
		r.need("set", "a rate alone says all there is; with the giving set it becomes drops")
	}
	r.atMostOne("rate", "drops")
	if r.given("drops") {
		r.need("set", "drops have no volume without it")
	}
	if r.given("behind") {
		r.need("volume", "what stays behind is a part of it")
	}
	return s
}

// Our own wide nets: no giving set makes fewer or more drops of one mL, and no
// line carries more than a litre a minute.
const (
	fastest     = 60000 // mL/h
	fewestDrops = 5
	mostDrops   = 100
)

// checkSet refuses a drop factor that no giving set has.
func (s *flowSum) checkSet(r *request) {
	if !s.set.Given() {
		return
	}
	if n := s.set.Rat(); n.Cmp(big.NewRat(fewestDrops, 1)) < 0 || n.Cmp(big.NewRat(mostDrops, 1)) > 0 {
		r.strange("set", refusal.ValueUnknown, "5 to 100 drops/mL", "is not what a giving set makes")
	}
}

// readRate reads a flow rate, or one for each kg.
func (s *flowSum) readRate(r *request) {
	if !strings.Contains(r.texts["rate"].text, "kg") {
		s.rate = read(r, "rate", quantity.ParseFlowRate)
		r.forbid("the rate is not per kg", "weight")
		return
	}
	s.perKg = read(r, "rate", quantity.ParseFlowPerKilogram)
	if !r.given("weight") {
		r.add(refusal.Reason{Code: refusal.WeightMissing, Field: "--weight", Rule: "R3",
			Message: "the rate is per kg and no body weight is given", Remedy: r.remedyFor("weight")})
	}
}

// work fills what the flags leave open, and the document.
func (s *flowSum) work(r *request, d *flowDocument) error {
	how := func(format string, args ...any) { d.Working = append(d.Working, fmt.Sprintf(format, args...)) }
	var err error
	if s.usable = s.volume; s.behind.Given() {
		if s.behind.Cmp(s.volume) >= 0 {
			return refusal.Reason{
				Code: refusal.ContradictoryAmounts, Severity: refusal.Refuse, Field: "--behind", Rule: "R5",
				Got: r.style.Volume(s.behind), Want: "less than " + r.style.Volume(s.volume),
				Message: fmt.Sprintf("%s stays behind of %s: nothing is given", r.style.Volume(s.behind), r.style.Volume(s.volume)),
				Remedy:  "check both volumes",
			}
		}
		if s.usable, err = s.volume.Minus(s.behind); err != nil {
			return err
		}
		d.Behind, d.Usable = volumeJSON(r.style, s.behind), volumeJSON(r.style, s.usable)
		how("%s - %s left behind = %s", r.style.Volume(s.volume), d.Behind.Printed, d.Usable.Printed)
	}
	if err = s.settleRate(r, how); err != nil {
		return err
	}
	switch {
	case s.usable.Given() && !s.time.Given():
		s.time, err = s.usable.Lasts(s.rate)
		d.headline = "duration"
		how("%s ÷ %s = %s", r.style.Volume(s.usable), shown(flowRateJSON(r.style, s.rate)), shownSpan(r.style, s.time))
	case s.time.Given() && !s.usable.Given():
		s.usable, err = s.rate.During(s.time)
		s.volume, d.headline = s.usable, "volume"
		how("%s x %s = %s", shown(flowRateJSON(r.style, s.rate)), shownSpan(r.style, s.time), shown(volumeJSON(r.style, s.usable)))
	}
	if err != nil {
		return err
	}
	return s.fill(r, d, how)
}

// settleRate works the flow rate from whatever says it.
func (s *flowSum) settleRate(r *request, how func(string, ...any)) error {
	var err error
	switch {
	case s.rate.Given():
	case s.perKg.Given():
		s.rate, err = s.perKg.For(s.weight)
		how("%s x body weight %s = %s", s.perKg.Written(), shown(bodyWeightJSON(r.style, s.weight)), shown(flowRateJSON(r.style, s.rate)))
	case s.drops.Given():
		s.rate, err = s.drops.Flow(s.set)
		how("%s ÷ %s = %s", r.style.DropRate(s.drops), r.style.DropFactor(s.set), shown(flowRateJSON(r.style, s.rate)))
	default: // volume and time are given: readFlow asked for them
		s.rate, err = s.usable.Over(s.time)
		how("%s ÷ %s = %s", r.style.Volume(s.usable), shownSpan(r.style, s.time), shown(flowRateJSON(r.style, s.rate)))
	}
	return err
}

// fill writes the figures into the document: pump step and whole drops are the
// two roundings, each named (rule R2).
func (s *flowSum) fill(r *request, d *flowDocument, how func(string, ...any)) error {
	if s.volume.Given() {
		d.Volume = volumeJSON(r.style, s.volume)
	}
	if s.time.Given() {
		d.Duration, d.span = durationJSON(r.style, s.time), shownSpan(r.style, s.time)
	}
	d.patientJSON = patient{weight: s.weight}.echo(r.style)
	d.FlowRate = flowRateJSON(r.style, s.rate)
	set, lost, err := s.rate.ToStep(s.step, quantity.HalfUp)
	if err != nil {
		return err
	}
	if set.Rat().Sign() <= 0 && !s.set.Given() {
		r.add(rateFault(r, &pump.BelowStep{Exact: s.rate, Step: s.step}))
		return nil
	}
	if set.Rat().Sign() > 0 {
		d.PumpRate, d.Lost = flowRateJSON(r.style, set), &quantityJSON{exactText(lost), signed(r.style, lost) + " %", "%"}
	}
	if s.rate.Rat().Cmp(big.NewRat(fastest, 1)) > 0 {
		r.add(refusal.Reason{
			Code: refusal.RateAbovePump, Field: "flow rate", Rule: "R8", Got: r.style.FlowRate(s.rate), Want: "at most 60,000 mL/h", Source: netSource,
			Message: r.style.FlowRate(s.rate) + " is more than any line carries", Remedy: "check volume, time and units",
		})
		return nil
	}
	if pump.Beyond(s.rate) {
		r.caution(refusal.Reason{Code: refusal.RateAbovePump, Field: "flow rate", Got: r.style.FlowRate(s.rate), Want: "a rate that a pump can be set to", Rule: "R8", Source: "common practice, no source",
			Message: r.style.FlowRate(s.rate) + " is more than pumps in common use can be set to", Remedy: "check volume, time and units"})
	}
	if !s.set.Given() {
		return nil
	}
	return s.count(r, d, how)
}

// count turns the flow rate into drops that a person can count.
func (s *flowSum) count(r *request, d *flowDocument, how func(string, ...any)) error {
	drops, err := s.rate.Drops(s.set)
	if err != nil {
		return err
	}
	counted, lost, err := drops.Counted()
	if err != nil {
		return err
	}
	d.DropRate = &quantityJSON{drops.Exact(), r.style.DropRate(drops), "drops/min"}
	if s.drops.Given() {
		return nil
	}
	if counted.Rat().Sign() == 0 {
		r.add(refusal.Reason{
			Code: refusal.RateBelowPump, Field: "drop rate", Rule: "R8", Got: r.style.DropRate(drops), Want: "at least half a drop a minute",
			Message: r.style.DropRate(drops) + " is less than anybody can count",
			Remedy:  "use a pump, or a giving set with more drops in one mL",
		})
		return nil
	}
	given, err := counted.Flow(s.set)
	if err != nil {
		return err
	}
	d.Counted, d.Delivered = &quantityJSON{counted.Exact(), r.style.DropRate(counted), "drops/min"}, flowRateJSON(r.style, given)
	if d.headline == "" {
		d.headline = "drops"
	}
	how("%s x %s = %s; half up to whole drops: %s (%s %%)", shown(d.FlowRate), r.style.DropFactor(s.set), shown(d.DropRate), d.Counted.Printed, signed(r.style, lost))
	return nil
}

func tellFlow(w io.Writer, d *flowDocument) {
	switch d.headline {
	case "duration":
		fmt.Fprintf(w, "it lasts %s\n", d.span)
	case "volume":
		fmt.Fprintf(w, "it gives %s\n", shown(d.Volume))
	case "drops":
		fmt.Fprintf(w, "count %s\n", d.Counted.Printed)
	default:
		fmt.Fprintf(w, "%s\n", shown(d.FlowRate))
	}
	for _, row := range []struct {
		name string
		q    *quantityJSON
	}{
		{"volume", d.Volume}, {"left behind", d.Behind}, {"given", d.Usable}, {"flow rate", d.FlowRate},
		{"drop rate", d.DropRate}, {"drops counted give", d.Delivered},
	} {
		if row.q != nil {
			line(w, row.name, shown(row.q))
		}
	}
	if d.Duration != nil {
		line(w, "time", d.span)
	}
	if d.PumpRate != nil {
		line(w, "pump rate", d.PumpRate.Printed+", "+d.Lost.Printed)
	}
	d.patientJSON.tell(w)
	for _, s := range d.Working {
		line(w, "how", s)
	}
}
