package sheets

import (
	"fmt"
	"math/big"

	"drawup/dilution"
	"drawup/dilution/body"
	"drawup/dilution/pump"
	"drawup/dilution/recheck"
	"drawup/labels"
)

// PumpCards is one card for each infusion of the list, in making order. Facts
// has one entry a plan, in the order of list.Plans.
func PumpCards(list dilution.List, facts []labels.Facts, m labels.Making) []Sheet {
	var out []Sheet
	for _, s := range scribesOf(list, facts, PaperPump) {
		if s.p.Infusion == nil {
			continue
		}
		out = append(out, Sheet{Paper: PaperPump, Size: A5, Title: "Pump card", Note: s.numbered(), Of: s.of(),
			Bookmark: s.of(), Syringe: s.p.Number, OnePage: true, Foot: footSaying(list, m), Parts: s.pumpParts(list)})
	}
	return out
}

// pumpParts is the card: what is entered, the range, the ladder, slips, the
// end of the syringe, who set it, the next syringe, what to mind.
func (s scribe) pumpParts(list dilution.List) []Part {
	n := s.p.Number
	holds := joined(s.say("{amount} in {final.volume}"+s.inDiluent()), labels.Words("; "+s.patient()))
	return []Part{
		{n, []Block{s.name(nil, holds, true), Big{s.entries()}}},
		{n, []Block{s.rangeTable()}},
		{n, []Block{Beside{LeftShare: 61, Left: []Block{s.ladder()}, Right: []Block{s.chart(), s.slips()}}}},
		{n, []Block{Pairs{Strong: []string{recheck.EmptyAt, recheck.UseBy}, List: []Pair{
			s.empty(),
			pair("Use by", s.say("{use.by}: change it then, empty or not"))}}}},
		{n, []Block{Sign{[]string{"programmed by, time", "checked alone by, time"}}}},
		{n, []Block{Words{Line: labels.Words("Next " + s.vessel() + ": read its label; is the concentration the same?"), Strong: true},
			Blank{Rows: 2, Columns: []Column{{Head: "time", Share: 16}, {Head: "same?", Share: 14},
				{Head: "old rate, mL/h", Share: 26}, {Head: "new rate, mL/h", Share: 26}, {Head: "initials", Share: 18}, {Head: "initials", Share: 18}}}}},
		{n, s.minded(list)},
	}
}

// minded is what the card says of the drug: its marks and the plan's own
// cautions, the gravest first. Their codes, what the formulary adds, and where
// it comes from stand on the draw-up sheet.
func (s scribe) minded(list dilution.List) []Block {
	text := "Notes and sources: draw-up sheet."
	if flags := s.flags(); flags != "" {
		text = "Marked: " + flags + ". " + text
	}
	out := []Block{Words{Line: labels.Words(text), Small: true}}
	c := gravest(s.cautions(list))
	for i := range c {
		c[i].Note, c[i].Code = nil, ""
	}
	if len(c) > 0 {
		out = append(out, Cautions{List: c, Rest: "More cautions: draw-up sheet."})
	}
	return out
}

func (s scribe) inDiluent() string {
	if s.p.Mixture.Diluent == "" {
		return ", undiluted"
	}
	return " {=" + s.p.Mixture.Diluent + "}"
}

// entries are what the pump asks for, in the order in which it is entered,
// then the rate that must come out.
func (s scribe) entries() []BigRow {
	conc := BigRow{Key: "1  concentration", Value: s.say(s.concentration()), Note: joined(s.say("{amount} in {final.volume}"), s.inRateUnit())}
	holder := BigRow{Key: "2  syringe", Value: s.say("{final.barrel}"), Note: s.say("holds {final.volume}")}
	if s.bag() {
		holder = BigRow{Key: "2  bag", Value: s.say("{final.volume}")}
	}
	rows := []BigRow{conc, holder}
	switch {
	case s.p.Infusion.Weight.Given():
		rows = append(rows, BigRow{Key: "3  weight", Value: s.say("{rate.weight}"), Note: s.weighed()})
	case s.p.Infusion.Surface.Given():
		rows = append(rows, BigRow{Key: "3  body surface", Value: s.say("{rate.weight}"), Note: s.say("{rate.weight.by}, by Mosteller")})
	}
	rows = append(rows, BigRow{Key: fmt.Sprintf("%d  dose rate", len(rows)+1), Value: s.say("{start.dose}"), Note: labels.Words("ordered")})
	return append(rows, BigRow{Key: "then it shows", Value: s.say("{start.rate}"), Note: s.say("which gives {start.delivered}"), Most: true})
}

// inRateUnit is the concentration in the unit of the dose rate, where the label
// has another one: whoever checks the pump's sum need not convert (rule N22).
func (s scribe) inRateUnit() labels.Line {
	text := s.p.Style.ConcentrationIn(s.p.Mixture.Concentration, s.p.Infusion.Start.Dose.Unit())
	if text == "" || text == s.f.Text(recheck.Concentration) {
		return nil
	}
	return joined(labels.Words(", that is "), s.said(text))
}

// weighed says which weight it is and where it comes from.
func (s scribe) weighed() labels.Line {
	note := s.say("{rate.weight.by} weight")
	switch {
	case s.p.Infusion.By != body.Actual:
		note = joined(note, labels.Words(", worked out"))
	case s.p.Patient.Estimated:
		note = joined(note, labels.Words(", an estimate"))
	}
	if s.p.Infusion.By == body.Actual && s.p.Patient.Weighed.Given() {
		note = joined(note, labels.Words(", "), labels.Words(s.p.Patient.Weighed.Value))
	}
	return note
}

// rangeTable is the range to titrate in and the hard limit, in both units.
func (s scribe) rangeTable() Table {
	t := Table{Columns: []Column{{Head: "Range", Share: 22}, {Head: "lowest", Share: 36}, {Head: "highest", Share: 36}, {Head: "HARD LIMIT", Share: 36}},
		Rows: []Row{{Cells: []labels.Line{labels.Words("dose rate"), s.say("{low.dose}"), s.say("{high.dose}"), labels.Words("none stored")}},
			{Strong: true, Cells: []labels.Line{labels.Words("pump rate"), s.say("{low.rate}"), s.say("{high.rate}"), labels.Words("stay in the range")}}}}
	if s.f.Has(recheck.LimitDose) {
		t.Rows[0].Cells[3], t.Rows[1].Cells[3] = s.say("{limit.dose}"), s.say("{limit.rate}")
	}
	return t
}

// ladder is the table to titrate by. A rung whose rounded rate passes an end
// of the range is left out: the ends stand in the range, rounded inwards.
func (s scribe) ladder() Table {
	t := Table{Columns: []Column{{Head: "dose rate", Share: 52}, {Head: "pump rate", Share: 26, Strong: true}, {Head: "gives", Share: 48}}}
	for i, rung := range s.p.Infusion.Ladder {
		if !s.inRange(rung) {
			continue
		}
		row := Row{Cells: []labels.Line{s.rung(i, "dose"), s.rung(i, "rate"), s.rung(i, "delivered")}}
		if n, err := rung.Dose.Cmp(s.p.Infusion.Start.Dose); err == nil && n == 0 {
			row.Strong = true
		}
		t.Rows = append(t.Rows, row)
	}
	return t
}

// inRange reports that the rounded rate lies within the range.
func (s scribe) inRange(x pump.Setting) bool {
	i := s.p.Infusion
	return x.Rate.Rat().Cmp(i.Low.Rate.Rat()) >= 0 && x.Rate.Rat().Cmp(i.High.Rate.Rat()) <= 0
}

func (s scribe) rung(i int, column string) labels.Line {
	return s.say("{" + recheck.Row(recheck.Ladder, i+1, column) + "}")
}

// slips are readings of the pump that mean a slip.
func (s scribe) slips() Table {
	t := Table{Columns: []Column{{Head: "STOP if it shows", Share: 40, Strong: true}, {Head: "likely slip", Share: 60}}}
	for i := range s.p.Infusion.Slips {
		t.Rows = append(t.Rows, Row{Cells: []labels.Line{
			s.say("{" + recheck.Row(recheck.Slip, i+1, "rate") + "}"), s.say("{" + recheck.Row(recheck.Slip, i+1, "kind") + "}")}})
	}
	return t
}

// chart is the straight line of dose rate against pump rate; its ticks are the
// figures of the start, of the upper end and of the ladder.
func (s scribe) chart() Chart {
	part := s.p.Infusion
	c := Chart{XWord: "pump rate", YWord: "dose rate", High: 10000}
	at := func(x pump.Setting) int { return share(x.Exact.Rat(), part.High.Exact.Rat()) }
	c.Low = at(part.Low)
	c.Points = append(c.Points, Point{At: at(part.Start), Dose: s.say("{start.dose}"), Rate: s.say("{start.rate}"), Start: true},
		Point{At: at(part.High), Dose: s.say("{high.dose}"), Rate: s.say("{high.rate}")})
	for i := len(part.Ladder) - 1; i >= 0; i-- {
		if s.inRange(part.Ladder[i]) {
			c.Points = append(c.Points, Point{At: at(part.Ladder[i]), Dose: s.rung(i, "dose"), Rate: s.rung(i, "rate")})
		}
	}
	return c
}

// share is a/b in 10,000 parts.
func share(a, b *big.Rat) int {
	if b.Sign() <= 0 {
		return 0
	}
	x := new(big.Rat).Mul(new(big.Rat).Quo(a, b), big.NewRat(10000, 1))
	return int(new(big.Int).Div(x.Num(), x.Denom()).Int64())
}
