package labels

import (
	"fmt"
	"math/big"
	"sort"
	"strings"
	"time"

	"drawup/dilution"
	"drawup/dilution/body"
	"drawup/dilution/pump"
	"drawup/dilution/quantity"
	"drawup/dilution/recheck"
)

// Facts are the printed figures of one plan, by the names of the second route.
// Every paper takes its figures from here, so that one figure reads the same
// wherever it stands.
type Facts struct {
	style quantity.Style
	text  map[string]string
	rungs int
	slips int
}

// FactsOf writes out every figure of p in its house style (rule R14).
func FactsOf(p dilution.Plan) Facts {
	w := Facts{style: p.Style, text: map[string]string{}}
	w.container(p)
	w.mixture(p)
	w.patient(p)
	w.dose(p)
	w.infusion(p)
	w.times(p)
	return w
}

// Has reports whether the plan has a figure of this name.
func (w Facts) Has(name string) bool { return w.text[name] != "" }

// Text is the figure as printed, "" if the plan has none of this name.
func (w Facts) Text(name string) string { return w.text[name] }

// Cell is the figure as a cell; the empty cell if there is none.
func (w Facts) Cell(name string) Cell {
	if !w.Has(name) {
		return Cell{}
	}
	return Cell{Text: w.text[name], Figure: name}
}

// Rungs is how many rows the ladder has, numbered from 1.
func (w Facts) Rungs() int { return w.rungs }

// Slips is how many readings of slips there are, numbered from 1.
func (w Facts) Slips() int { return w.slips }

func (w Facts) put(name, text string) {
	if text != "" {
		w.text[name] = text
	}
}

func (w Facts) container(p dilution.Plan) {
	s, pr := w.style, p.Presentation
	w.put(recheck.ContainerAmount, s.Amount(pr.Amount))
	w.put(recheck.ContainerVolume, s.Volume(pr.Volume))
	w.put(recheck.Strength, s.Concentration(p.Mixture.Strength))
	if pr.Powder() {
		w.put(recheck.PowderAdded, s.Volume(pr.Added))
		switch {
		case pr.Negligible:
			w.put(recheck.PowderDisplaced, "0 mL")
		case !pr.Obtained:
			w.put(recheck.PowderDisplaced, s.Volume(pr.Displacement.Value))
		}
	}
	w.put(recheck.ATC, p.Drug.ATC)
	w.packs(p)
}

// packs counts the containers. Where several sizes are opened, the counts and
// what is left over wait for the second route's sum; until then the papers say
// which sizes, in words.
func (w Facts) packs(p dilution.Plan) {
	s, m := w.style, p.Mixture
	if m.Mixed() && !printed(recheck.Row(recheck.Pack, 1, "count")) {
		return
	}
	w.put(recheck.ContainerCount, fmt.Sprint(m.Containers))
	w.put(recheck.LeftVolume, s.Volume(m.LeftVolume))
	w.put(recheck.LeftAmount, s.Amount(m.LeftAmount))
	if !m.Mixed() {
		return
	}
	for i, pack := range m.Packs {
		row := func(column string) string { return recheck.Row(recheck.Pack, i+1, column) }
		w.put(row("presentation"), pack.Presentation.ID)
		w.put(row("amount"), s.Amount(pack.Presentation.Amount))
		w.put(row("volume"), s.Volume(pack.Presentation.Volume))
		w.put(row("count"), fmt.Sprint(pack.Count))
	}
}

// known puts a figure whose sum the second route may not have yet.
func (w Facts) known(name, text string) {
	if printed(name) {
		w.put(name, text)
	}
}

func (w Facts) mixture(p dilution.Plan) {
	s, m := w.style, p.Mixture
	w.put(recheck.Method, m.Method.String())
	w.put(recheck.DrugWanted, s.Volume(m.DrugWanted))
	w.put(recheck.DrugMoved, movedText(s, m.DrugReading.MovedPercent))
	w.put(recheck.DrugVolume, s.Volume(m.DrugVolume))
	w.put(recheck.DrugStep, s.Volume(m.DrugReading.Barrel.Step()))
	w.put(recheck.DrugBarrel, s.Volume(m.DrugReading.Barrel.Nominal()))
	w.put(recheck.DiluentVolume, s.Volume(m.DiluentVolume))
	w.put(recheck.FinalVolume, s.Volume(m.FinalVolume))
	if !m.InBag {
		w.put(recheck.FinalBarrel, s.Volume(m.FinalBarrel.Nominal()))
	}
	w.put(recheck.AmountInSyringe, s.Amount(m.Amount))
	w.put(recheck.Concentration, s.Concentration(m.Concentration))
	w.put(recheck.SecondContainer, s.Amount(p.Presentation.SecondAmount))
	w.put(recheck.SecondAmount, s.Amount(m.SecondAmount))
	w.put(recheck.SecondConcentrated, s.Concentration(m.SecondConc))
	if p.Drug.Substance.Given() {
		w.put(recheck.SubstanceFactor, s.Amount(p.Drug.Substance.Value.PerGram)+"/g")
	}
	w.put(recheck.SubstanceAmount, s.Amount(m.Substance))
	w.put(recheck.SubstanceConc, s.Concentration(m.SubstanceConc))
	w.put(recheck.Assay, s.Percent(m.Assay))
	w.put(recheck.IntervalPercent, s.Percent(m.Interval))
	w.put(recheck.IntervalLow, s.Concentration(m.Low))
	w.put(recheck.IntervalHigh, s.Concentration(m.High))
}

// patient writes the body's figures: as typed, and those that were used.
func (w Facts) patient(p dilution.Plan) {
	s, size := w.style, p.Size
	w.put(recheck.WeightActual, s.BodyWeight(size.Weight))
	w.put(recheck.Height, s.Length(size.Height))
	if size.Age.Given() {
		w.put(recheck.Age, size.Age.String())
	}
	w.put(recheck.Sex, size.Sex.String())
	used := map[body.Kind]bool{}
	if p.Dose != nil {
		used[p.Dose.By] = true
	}
	if p.Infusion != nil {
		used[p.Infusion.By] = true
	}
	for _, k := range []struct {
		kind       body.Kind
		name, full string
	}{
		{body.Ideal, recheck.WeightIdeal, recheck.IdealFull},
		{body.Adjusted, recheck.WeightAdjusted, recheck.AdjustedFull},
		{body.Lean, recheck.WeightLean, recheck.LeanFull},
	} {
		if !used[k.kind] && !(k.kind == body.Ideal && used[body.Adjusted]) {
			continue
		}
		if weight, err := size.Used(k.kind); err == nil {
			w.put(k.name, s.BodyWeight(weight))
			w.put(k.full, fullWeight(size, k.kind))
		}
	}
	if used[body.Surface] {
		if area, err := size.UsedSurface(); err == nil {
			w.put(recheck.SurfaceArea, s.Surface(area))
		}
	}
}

func (w Facts) dose(p dilution.Plan) {
	d, s := p.Dose, w.style
	if d == nil {
		return
	}
	w.put(recheck.Dose, s.Dose(d.Ordered))
	w.put(recheck.DoseWeightBy, d.By.String())
	w.put(recheck.DoseWeight, scalarText(s, d.Weight, d.Surface))
	w.put(recheck.DoseAmount, s.Amount(d.Amount))
	w.put(recheck.DoseWanted, s.Volume(d.Wanted))
	w.put(recheck.DoseMoved, movedText(s, share(d.Volume, d.Wanted)))
	w.put(recheck.DoseVolume, s.Volume(d.Volume))
	w.put(recheck.DoseStep, s.Volume(d.Step))
	w.put(recheck.DoseDelivered, s.Amount(d.Delivered))
	w.known(recheck.DoseCount, p.Order.Doses.Text)
}

// movedText is what a rounding lost: "1.12 % more", "0.7 % less", "nothing".
func movedText(s quantity.Style, percent *big.Rat) string {
	if percent == nil || percent.Sign() == 0 {
		return "nothing"
	}
	text := s.Percent(quantity.PerCent(new(big.Rat).Abs(percent)))
	if percent.Sign() > 0 {
		return text + " more"
	}
	return text + " less"
}

// share is how far got lies from wanted, in per cent of wanted.
func share(got, wanted quantity.Volume) *big.Rat {
	if !wanted.Given() || wanted.IsZero() {
		return nil
	}
	d := new(big.Rat).Sub(got.Rat(), wanted.Rat())
	return d.Mul(d, big.NewRat(100, 1)).Quo(d, wanted.Rat())
}

// fullWeight is a computed weight before it is rounded to 0.1 kg, to four
// decimals.
func fullWeight(size body.Size, kind body.Kind) string {
	var weight quantity.BodyWeight
	var err error
	switch kind {
	case body.Ideal:
		weight, err = size.Ideal()
	case body.Adjusted:
		weight, err = size.Adjusted()
	case body.Lean:
		weight, err = size.Lean()
	case body.Actual, body.Surface, body.None:
		return ""
	}
	if err != nil {
		return ""
	}
	if weight, err = weight.ToStep(big.NewRat(1, 10000), quantity.HalfUp); err != nil {
		return ""
	}
	return weight.Exact() + " kg"
}

func scalarText(s quantity.Style, weight quantity.BodyWeight, area quantity.BodySurfaceArea) string {
	if area.Given() {
		return s.Surface(area)
	}
	return s.BodyWeight(weight)
}

func (w *Facts) infusion(p dilution.Plan) {
	part, s := p.Infusion, w.style
	if part == nil {
		return
	}
	w.put(recheck.RateWeightBy, part.By.String())
	w.put(recheck.RateWeight, scalarText(s, part.Weight, part.Surface))
	w.put(recheck.RateStep, s.FlowRate(part.Step))
	w.put(recheck.StartDose, s.DoseRate(part.Start.Dose))
	w.put(recheck.StartFlow, s.FlowRate(part.Start.Exact))
	w.put(recheck.StartMoved, movedText(s, part.Start.LostPercent))
	w.put(recheck.StartRate, s.FlowRate(part.Start.Rate))
	w.put(recheck.StartDelivered, s.DoseRate(part.Start.Delivered))
	for _, x := range []struct {
		set        pump.Setting
		dose, rate string
	}{
		{part.Low, recheck.LowDose, recheck.LowRate},
		{part.High, recheck.HighDose, recheck.HighRate},
		{part.Limit, recheck.LimitDose, recheck.LimitRate},
	} {
		w.put(x.dose, inUnit(s, x.set.Dose, part.Start.Dose))
		w.put(x.rate, s.FlowRate(x.set.Rate))
	}
	for i, rung := range part.Ladder {
		w.put(recheck.Row(recheck.Ladder, i+1, "dose"), s.DoseRate(rung.Dose))
		w.put(recheck.Row(recheck.Ladder, i+1, "rate"), s.FlowRate(rung.Rate))
		w.put(recheck.Row(recheck.Ladder, i+1, "delivered"), s.DoseRate(rung.Delivered))
	}
	w.rungs = len(part.Ladder)
	for i, slip := range part.Slips {
		w.put(recheck.Row(recheck.Slip, i+1, "kind"), slip.Kind)
		w.put(recheck.Row(recheck.Slip, i+1, "rate"), s.FlowRate(slip.Rate))
	}
	w.slips = len(part.Slips)
	w.runs(p)
}

// runs is how long the infusion lasts. Where something is counted off for the
// line and the dead space, the time that is left waits for the second route's
// sum; until then the papers say so in words, and no time to the last drop, which
// would be too long.
func (w Facts) runs(p dilution.Plan) {
	part, s := p.Infusion, w.style
	minutes := part.Minutes
	if part.CountsOff() {
		if !printed(recheck.UsableTime) {
			return
		}
		minutes = part.Usable
		w.put(recheck.UsableTime, Span(minutes))
		w.put(recheck.Priming, s.Volume(part.Priming))
		w.put(recheck.DeadSpace, s.Volume(part.DeadSpace))
	} else {
		w.put(recheck.RunTime, Span(minutes))
	}
	w.known(recheck.WantedTime, p.Order.Hours.Text)
	w.known(recheck.RuleRate, s.DoseRate(part.Each))
	empty := p.Prepared.Add(time.Duration(minutes) * time.Minute)
	w.put(recheck.EmptyAt, Moment(s, empty))
	w.put(recheck.EmptyOffset, empty.Format("-07:00"))
}

// inUnit is a dose rate in the unit of the start's, so that a card shows one
// unit throughout (rule N22); in its own where the two are counted unlike.
func inUnit(s quantity.Style, d, start quantity.DoseRate) string {
	if text := s.DoseRateIn(d, start.Unit()); text != "" {
		return text
	}
	return s.DoseRate(d)
}

func (w Facts) times(p dilution.Plan) {
	w.put(recheck.Prepared, Moment(w.style, p.Prepared))
	w.put(recheck.PreparedOffset, p.Prepared.Format("-07:00"))
	w.put(recheck.UseHours, Span(p.UseBy.Minutes))
	w.put(recheck.UseBy, Moment(w.style, p.UseBy.At))
	w.put(recheck.UseByOffset, p.UseBy.At.Format("-07:00"))
}

// Moment is a date and time as the style prints it (rule N25): two ways that
// cannot be misread, always with the time of day.
func Moment(s quantity.Style, t time.Time) string {
	if s.String() == "uk" {
		return t.Format("02 Jan 2006 15:04")
	}
	return t.Format("2006-01-02 15:04")
}

// Span is a number of minutes in hours and minutes: "9 h 25 min", "45 min".
func Span(minutes int64) string {
	h, m := minutes/60, minutes%60
	hours := quantity.UK().Number(new(big.Rat).SetInt64(h)) + " h" // groups from 1,000 on
	switch {
	case h == 0:
		return fmt.Sprintf("%d min", m)
	case m == 0:
		return hours
	}
	return fmt.Sprintf("%s %d min", hours, m)
}

// printed reports whether the papers print figures of this name yet. The second
// route has a sum for the counts of doses, hours and sizes of container, but it
// wants all partners of a figure beside it, and the sheets do not place them all
// so far: until they do, they say it in words.
func printed(name string) bool {
	if strings.HasPrefix(name, recheck.Pack+".") {
		return false
	}
	switch name {
	case recheck.DoseCount, recheck.Priming, recheck.DeadSpace, recheck.WantedTime, recheck.UsableTime, recheck.RuleRate:
		return false
	}
	return recheck.Knows(name)
}

// Capital is a drug's name as labels print it: lower case with an initial
// capital; a name that already carries capitals stays as it is (5.4.2).
func Capital(name string) string {
	if name == "" || strings.ToLower(name) != name {
		return name
	}
	return strings.ToUpper(name[:1]) + name[1:]
}

// All is every figure of the plan as it would stand on one paper, sorted by
// name. Papers print some of them; the second route may see them all.
func (w Facts) All(paper string) []recheck.Figure {
	out := make([]recheck.Figure, 0, len(w.text))
	for name, text := range w.text {
		out = append(out, recheck.Figure{Paper: paper, Name: name, Text: text})
	}
	sort.Slice(out, func(i, j int) bool { return out[i].Name < out[j].Name })
	return out
}
