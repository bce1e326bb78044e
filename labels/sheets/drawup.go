package sheets

import (
	"fmt"
	"slices"
	"strings"

	"drawup/dilution"
	"drawup/dilution/recheck"
	"drawup/dilution/refusal"
	"drawup/dilution/syringe"
	"drawup/labels"
)

// Labelling is the rule that a tray of labels printed at once goes against.
const Labelling = "Label each syringe when it is full, before it leaves the hand, and match the label with the ampoule. " +
	"Finish one drug before the next. Labels that were printed all at once lie ready for the wrong syringe: take them one by one."

// DrawUp is the draw-up sheet of a list: what to fetch, each syringe's steps
// in making order, what is left over, what was left out. Facts has one entry a
// plan, in the order of list.Plans.
func DrawUp(list dilution.List, facts []labels.Facts, m labels.Making) []Sheet {
	all := scribesOf(list, facts)
	var sources sourceList
	sheet := Sheet{Paper: PaperDrawUp, Size: A4, Title: "Draw-up sheet", Bookmark: "Draw-up sheet", Foot: footOf(m)}
	sheet.Parts = append(sheet.Parts, before(list), fetchPart(all))
	for _, s := range all {
		sheet.Parts = append(sheet.Parts, s.drawUpPart(list, &sources))
	}
	sheet.Parts = append(sheet.Parts, wastePart(all), leftOutPart(list))
	sheet.Parts = append(sheet.Parts, notesParts(all, &sources)...)
	sheet.Parts = append(sheet.Parts, sources.part(0))
	sheet.Parts = slices.DeleteFunc(sheet.Parts, func(p Part) bool { return len(p.Blocks) == 0 })
	return []Sheet{sheet}
}

// before is what must be read first.
func before(list dilution.List) Part {
	p := Part{Blocks: []Block{Words{Line: labels.Words(Labelling), Strong: true}}}
	if n := len(list.LeftOut); n > 0 {
		var numbers []string
		for _, l := range list.LeftOut {
			numbers = append(numbers, fmt.Sprintf("%d (%s)", l.Number, l.Drug))
		}
		p.Blocks = append(p.Blocks, Cautions{[]Caution{{Code: string(refusal.SyringesLeftOut),
			Text: "Not on this sheet: syringe " + strings.Join(numbers, ", ") + ". The reasons stand at the end."}}})
	}
	if c := listCautions(list); len(c) > 0 {
		p.Blocks = append(p.Blocks, Cautions{c})
	}
	return p
}

// listCautions are those that concern no single syringe.
func listCautions(list dilution.List) []Caution {
	var out []Caution
	for _, r := range list.Cautions.Of(0) {
		out = append(out, cautionOf(r))
	}
	return out
}

// fetchPart is the table of containers, fluids and syringes, one row a syringe.
func fetchPart(all []scribe) Part {
	t := Table{Box: true, Columns: []Column{{Head: "No.", Share: 6}, {Head: "Drug", Share: 26}, {Head: "Containers", Share: 46}, {Head: "Fluid", Share: 43}, {Head: "Draw with", Share: 15}, {Head: "Fill", Share: 20}}}
	for _, s := range all {
		m := s.p.Mixture
		with := s.say("{" + recheck.DrugBarrel + "}")
		into := s.say("{" + recheck.FinalBarrel + "} syringe")
		switch {
		case s.bag():
			into = labels.Words("bag")
		case s.oneSyringe():
			with = labels.Words("the same")
		}
		t.Rows = append(t.Rows, Row{Syringe: s.p.Number, Cells: []labels.Line{
			labels.Words(fmt.Sprint(s.p.Number)), labels.Words(s.drug()), s.say(s.containers() + s.each() + s.contents()),
			s.fluids(m), with, into,
		}})
	}
	blocks := []Block{heading("Fetch"), t}
	if sums := barrels(all); sums != "" {
		blocks = append(blocks, Words{Line: labels.Words(sums), Small: true})
	}
	return Part{Blocks: blocks}
}

// each stands between the count of containers and what one of them holds.
func (s scribe) each() string {
	if s.p.Mixture.Containers == 1 {
		return ", "
	}
	return ", each "
}

// oneSyringe reports that the drug is drawn into the syringe that is given.
func (s scribe) oneSyringe() bool {
	m := s.p.Mixture
	return !m.InBag && m.DrugReading.Barrel.Given() && m.FinalBarrel.Given() && m.DrugReading.Barrel.Nominal().Cmp(m.FinalBarrel.Nominal()) == 0
}

// fluids are the fluids to fetch for one syringe.
func (s scribe) fluids(m dilution.Mixture) labels.Line {
	var parts []labels.Line
	if s.f.Has(recheck.PowderAdded) {
		parts = append(parts, s.say("{"+recheck.PowderAdded+"} "+m.AddFluid+" for the powder"+s.eachPowder()))
	}
	switch m.Method {
	case dilution.AddTo:
		parts = append(parts, s.say("bag of {"+recheck.DiluentVolume+"} "+m.Diluent))
	case dilution.WithdrawThenAdd:
		parts = append(parts, s.say("bag of {"+recheck.FinalVolume+"} "+m.Diluent))
	case dilution.MakeUpTo:
		parts = append(parts, s.say("{"+recheck.DiluentVolume+"} "+m.Diluent))
	case dilution.Neat:
	}
	if len(parts) == 0 {
		return labels.Words("none")
	}
	out := parts[0]
	for _, p := range parts[1:] {
		out = joined(out, labels.Words("; "), p)
	}
	return out
}

func (s scribe) eachPowder() string {
	if s.p.Mixture.Containers > 1 {
		return " in each"
	}
	return ""
}

// barrels counts the syringes to lay out by size, the smallest first.
func barrels(all []scribe) string {
	var sizes []syringe.Barrel
	counts := map[string]int{}
	count := func(b syringe.Barrel) {
		if !b.Given() {
			return
		}
		if counts[b.Nominal().Exact()]++; counts[b.Nominal().Exact()] == 1 {
			sizes = append(sizes, b)
		}
	}
	for _, s := range all {
		count(s.p.Mixture.FinalBarrel)
		if !s.oneSyringe() {
			count(s.p.Mixture.DrugReading.Barrel)
		}
	}
	slices.SortFunc(sizes, func(a, b syringe.Barrel) int { return a.Nominal().Cmp(b.Nominal()) })
	var out []string
	for _, b := range sizes {
		out = append(out, fmt.Sprintf("%d of %s mL", counts[b.Nominal().Exact()], b.Nominal().Exact()))
	}
	if len(out) == 0 {
		return ""
	}
	return "Syringes in all: " + strings.Join(out, ", ") + "."
}

// drawUpPart is one syringe: head, steps, what results, cautions.
func (s scribe) drawUpPart(list dilution.List, sources *sourceList) Part {
	below := joined(labels.Words(s.patient()+"; "+s.p.Route+"; "), s.say(s.container()))
	steps := Steps{List: s.steps(), Strong: []string{recheck.DrugVolume, recheck.FinalVolume, recheck.PowderAdded}}
	right := []Block{Pairs{Dense: true, List: s.results(), Strong: []string{recheck.DoseVolume, recheck.UseBy, recheck.StartRate}}}
	if c := append(s.cautions(list), sources.short(s)...); len(c) > 0 {
		right = append(right, Cautions{c})
	}
	return Part{Syringe: s.p.Number, Blocks: []Block{
		s.name(s.say(s.concentration()), below, false),
		Beside{LeftShare: 52, Left: []Block{steps}, Right: right},
	}}
}

// results are what the syringe holds when the steps are done.
func (s scribe) results() []Pair {
	var out []Pair
	if s.p.Dose != nil {
		out = append(out, Pair{"One dose", s.doseLine()})
	}
	if s.p.Infusion != nil {
		out = append(out, Pair{"Pump", s.say("start {start.rate}; see the pump card")})
	}
	out = append(out, Pair{"Use by", joined(s.say("{use.by}, after {use.hours}"), labels.Words(": "+s.p.UseBy.Won+" ends first"))})
	out = append(out, Pair{"Holds", s.say("{amount} in {final.volume}, " + s.concentration() + s.countedAs())})
	if s.f.Has(recheck.SubstanceAmount) {
		out = append(out, Pair{"That is", s.say("{substance.amount}, {substance.concentration}")})
	}
	if s.f.Has(recheck.SecondAmount) {
		out = append(out, Pair{"With", s.say("{second.amount} " + s.p.Presentation.SecondName + ", {second.concentration}")})
	}
	out = append(out, Pair{"Truly", joined(s.say("{interval.low} to {interval.high}, plus or minus {interval.percent}"), labels.Words(s.assumed()))})
	if flags := s.flags(); flags != "" {
		out = append(out, words("Marked", flags))
	}
	return append(out, s.noted()...)
}

// noted points to the notes at the end of the sheet.
func (s scribe) noted() []Pair {
	n := len(s.p.Drug.Cautions)
	switch n {
	case 0:
		return nil
	case 1:
		return []Pair{words("Notes", "1 of the formulary, at the end")}
	}
	return []Pair{words("Notes", fmt.Sprintf("%d of the formulary, at the end", n))}
}

func (s scribe) countedAs() string {
	if s.p.Drug.CountedAs == "" {
		return ""
	}
	return ", counted as " + s.p.Drug.CountedAs
}

func (s scribe) assumed() string {
	if s.p.Mixture.AssayAssumed {
		return " (assay limits assumed)"
	}
	return ""
}

// doseLine is one dose out of the syringe and what was ordered.
func (s scribe) doseLine() labels.Line {
	by := ""
	if s.f.Has(recheck.DoseWeight) {
		by = " by {dose.weight.by} weight, {dose.weight}"
		if s.p.Dose.Surface.Given() {
			by = " by body {dose.weight.by}, {dose.weight}"
		}
	}
	whole := ""
	if s.p.Dose.Volume.Cmp(s.p.Mixture.FinalVolume) == 0 {
		whole = ", the whole syringe"
	}
	return s.say("{dose.volume} gives {dose.delivered}" + whole + "; ordered {dose}" + by)
}

// notesParts are the formulary's notes, once a drug, in order of making.
func notesParts(all []scribe, sources *sourceList) []Part {
	var out []Part
	seen := map[string]bool{}
	for _, s := range all {
		name := s.p.Drug.Name
		c := sources.cautions(s.p.Drug.Cautions)
		if seen[name] || len(c) == 0 {
			continue
		}
		seen[name] = true
		half := (len(c) + 1) / 2
		out = append(out, Part{Blocks: []Block{heading("Notes of the formulary on " + s.drug()),
			Beside{LeftShare: 50, Left: []Block{Cautions{c[:half]}}, Right: []Block{Cautions{c[half:]}}}}})
	}
	return out
}

// wastePart is what is left in the containers, to be discarded.
func wastePart(all []scribe) Part {
	t := Table{Columns: []Column{{Head: "No.", Share: 8}, {Head: "Drug", Share: 40}, {Head: "Left over", Share: 24}, {Head: "That is", Share: 28}, {Head: "Discarded by", Share: 38}, {Head: "Witness", Share: 38}}}
	for _, s := range all {
		if !s.p.Mixture.LeftVolume.Given() || s.p.Mixture.LeftVolume.IsZero() {
			continue
		}
		witness := labels.Words("not asked for")
		if s.p.Drug.Has("controlled") {
			witness = labels.Words("____________")
		}
		t.Rows = append(t.Rows, Row{Syringe: s.p.Number, Cells: []labels.Line{labels.Words(fmt.Sprint(s.p.Number)), labels.Words(s.drug()),
			s.say("{left.volume}"), s.say("{left.amount}"), labels.Words("____________"), witness}})
	}
	if len(t.Rows) == 0 {
		return Part{}
	}
	return Part{Blocks: []Block{heading("Left over in the containers, to be discarded"), t}}
}

// leftOutPart says which syringes were left out and why.
func leftOutPart(list dilution.List) Part {
	if len(list.LeftOut) == 0 {
		return Part{}
	}
	blocks := []Block{heading("Left out on request")}
	for _, l := range list.LeftOut {
		c := []Caution{}
		for _, r := range l.Reasons {
			c = append(c, cautionOf(r))
		}
		if len(c) == 0 {
			c = append(c, Caution{Text: "Nothing spoke against it."})
		}
		blocks = append(blocks, Words{Line: labels.Words(fmt.Sprintf("Syringe %d, %s", l.Number, l.Drug)), Strong: true}, Cautions{c})
	}
	return Part{Blocks: blocks}
}
