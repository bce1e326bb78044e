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
	all := scribesOf(list, facts, PaperDrawUp)
	var sources sourceList
	sheet := Sheet{Paper: PaperDrawUp, Size: A4, Title: "Draw-up sheet", Bookmark: "Draw-up sheet", Foot: footOf(m)}
	sheet.Parts = append(sheet.Parts, before(list, all), fetchPart(all), barrelsPart(all))
	for _, s := range all {
		sources.record(s, list.Formulary)
		sheet.Parts = append(sheet.Parts, s.drawUpPart(list, &sources))
	}
	sheet.Parts = append(sheet.Parts, wastePart(all), leftOutPart(list))
	sheet.Parts = append(sheet.Parts, notesParts(all, &sources)...)
	sheet.Parts = append(sheet.Parts, sources.part(0))
	sheet.Parts = slices.DeleteFunc(sheet.Parts, func(p Part) bool { return len(p.Blocks) == 0 })
	return []Sheet{sheet}
}

// before is what must be read first.
func before(list dilution.List, all []scribe) Part {
	p := Part{Blocks: []Block{Words{Line: labels.Words(Labelling), Strong: true}}}
	if names := leftOutNames(list); names != "" {
		p.Blocks = append(p.Blocks, Cautions{List: []Caution{{Code: string(refusal.SyringesLeftOut),
			Text: labels.Words("Not on this sheet: " + names + ". The reasons stand at the end.")}}})
	}
	if c := listCautions(list, all); len(c) > 0 {
		p.Blocks = append(p.Blocks, Cautions{List: c})
	}
	return p
}

// listCautions are those that concern several syringes. A figure in one of
// them is said of the first syringe whose assay limits are assumed, since it
// is the only figure that they share.
func listCautions(list dilution.List, all []scribe) []Caution {
	var out []Caution
	at := max(0, slices.IndexFunc(all, func(s scribe) bool { return s.p.Mixture.AssayAssumed }))
	if len(all) == 0 {
		return nil
	}
	for _, r := range list.Cautions.Of(0) {
		out = append(out, Caution{Text: all[at].saidOfAll(inFull(r)), Code: string(r.Code), Syringe: all[at].p.Number})
	}
	return out
}

// fetchPart is the table of containers, fluids and syringes, one row a syringe.
func fetchPart(all []scribe) Part {
	t := Table{Box: true, Columns: []Column{{Head: "No.", Share: 6}, {Head: "For", Share: 15}, {Head: "Drug", Share: 27}, {Head: "Containers", Share: 49}, {Head: "Fluid", Share: 40}, {Head: "Draw with", Share: 15}, {Head: "Fill", Share: 13}}}
	for _, s := range all {
		m := s.p.Mixture
		with := s.say("{" + recheck.DrugBarrel + "}")
		into := s.say("{" + recheck.FinalBarrel + "}")
		switch {
		case s.bag():
			into = labels.Words("bag")
		case s.oneSyringe():
			with = labels.Words("the same")
		}
		t.Rows = append(t.Rows, Row{Syringe: s.p.Number, Cells: []labels.Line{
			labels.Words(fmt.Sprint(s.p.Number)), labels.Words(s.p.Patient.ID.Value), labels.Words(s.drug()), s.opened(),
			s.fluids(m), with, into,
		}})
	}
	return Part{Blocks: []Block{heading("Fetch"), t}}
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
		parts = append(parts, joined(s.say("{"+recheck.PowderAdded+"} {="+m.AddFluid+"} for the powder"+s.eachPowder()), s.diluentFrom(true)))
	}
	switch m.Method {
	case dilution.AddTo:
		parts = append(parts, s.say("bag of {"+recheck.DiluentVolume+"} {="+m.Diluent+"}"))
	case dilution.WithdrawThenAdd:
		parts = append(parts, s.say("bag of {"+recheck.FinalVolume+"} {="+m.Diluent+"}"))
	case dilution.MakeUpTo:
		parts = append(parts, joined(s.say("{"+recheck.DiluentVolume+"} {="+m.Diluent+"}"), s.diluentFrom(false)))
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

// barrelsPart is the syringes to lay out by size, the smallest first, each
// with the numbers that it is for.
func barrelsPart(all []scribe) Part {
	var sizes []syringe.Barrel
	rows := map[string]*Row{}
	numbers := map[string][]string{}
	add := func(s scribe, b syringe.Barrel, name string) {
		if !b.Given() {
			return
		}
		key := b.Nominal().Exact()
		if rows[key] == nil {
			sizes = append(sizes, b)
			rows[key] = &Row{Syringe: s.p.Number, Cells: []labels.Line{s.say("{" + name + "}")}}
		}
		numbers[key] = append(numbers[key], fmt.Sprint(s.p.Number))
	}
	for _, s := range all {
		add(s, s.p.Mixture.FinalBarrel, recheck.FinalBarrel)
		if !s.oneSyringe() {
			add(s, s.p.Mixture.DrugReading.Barrel, recheck.DrugBarrel)
		}
	}
	if len(sizes) == 0 {
		return Part{}
	}
	slices.SortFunc(sizes, func(a, b syringe.Barrel) int { return a.Nominal().Cmp(b.Nominal()) })
	t := Table{Box: true, Small: true, Columns: []Column{{Head: "Syringes", Share: 20, Strong: true}, {Head: "one each for", Share: 160}}}
	for _, b := range sizes {
		key := b.Nominal().Exact()
		word := "syringes "
		if len(numbers[key]) == 1 {
			word = "syringe "
		}
		row := *rows[key]
		row.Cells = append(row.Cells, labels.Words(word+strings.Join(numbers[key], ", ")))
		t.Rows = append(t.Rows, row)
	}
	return Part{Blocks: []Block{t}}
}

// drawUpPart is one syringe: head, steps, what results, cautions.
func (s scribe) drawUpPart(list dilution.List, sources *sourceList) Part {
	below := joined(labels.Words(s.patient()+"; "+s.p.Route+"; "), s.supplied())
	steps := Steps{List: s.steps(), Strong: []string{recheck.DrugVolume, recheck.FinalVolume, recheck.PowderAdded}}
	right := []Block{Pairs{Dense: true, List: s.results(), Strong: []string{recheck.DoseVolume, recheck.UseBy, recheck.StartRate}}}
	if c := append(s.cautions(list), sources.short(s)...); len(c) > 0 {
		right = append(right, Cautions{List: c})
	}
	return Part{Syringe: s.p.Number, Blocks: []Block{
		s.drawName(below),
		Beside{LeftShare: 52, Left: []Block{steps}, Right: right},
	}}
}

// drawName is the head of the syringe with the volume to draw large, since the
// preparer needs it first, and the concentration below the name.
func (s scribe) drawName(below labels.Line) Name {
	name := s.name(s.say(s.concentration()), below, false)
	draw := "draw {drug.volume}"
	if s.p.Presentation.Powder() {
		draw = "add {powder.added}"
		if s.p.Mixture.Containers > 1 {
			draw += " to each"
		}
		draw += ", draw {drug.volume}"
	}
	name.Act, name.Then = s.say(draw), s.say(s.filling())
	return name
}

// filling is the pattern of what becomes of the drawn volume (rule R5).
func (s scribe) filling() string {
	switch s.p.Mixture.Method {
	case dilution.Neat:
		return "neat"
	case dilution.MakeUpTo:
		return "make up to {final.volume}"
	case dilution.AddTo:
		return "add to the full bag: {final.volume} in all"
	case dilution.WithdrawThenAdd:
		return "first withdraw as much from the bag; {final.volume} in all"
	}
	return "{method}" // not known: the second route stops it
}

// results are what the syringe holds when the steps are done.
func (s scribe) results() []Pair {
	var out []Pair
	if s.p.Dose != nil {
		out = append(out, pair("One dose", s.doseLine()))
	}
	if s.p.Order.Doses.Given() {
		out = append(out, pair("Doses", s.doses()))
	}
	if part := s.p.Infusion; part != nil {
		out = append(out, pair("Pump", s.say("start {start.rate}; see the pump card")))
		if part.Wanted > 0 || part.CountsOff() {
			out = append(out, pair("Lasts", s.lasts()))
		}
	}
	if line := s.oneWeight(); line != nil {
		out = append(out, pair("Made for", line))
	}
	out = append(out, s.chosen()...)
	out = append(out, pair("Use by", joined(s.say("{use.by}, after {use.hours}: "), s.won(), labels.Words(" ends first"))))
	out = append(out, pair("Holds", s.say("{amount} in {final.volume}, "+s.concentration()+s.countedAs())))
	if s.f.Has(recheck.SubstanceAmount) {
		out = append(out, pair("That is", s.say("{substance.amount}, {substance.concentration}")))
	}
	if s.f.Has(recheck.SecondAmount) {
		out = append(out, pair("With", s.say("{second.amount} "+s.p.Presentation.SecondName+", {second.concentration}")))
	}
	out = append(out, pair("Truly", joined(s.say("{interval.low} to {interval.high}, plus or minus {interval.percent}"), labels.Words(s.assumed()))))
	if flags := s.flags(); flags != "" {
		out = append(out, words("Marked", flags))
	}
	if len(s.p.Drug.Cautions) > 0 {
		out = append(out, words("Notes", "of the formulary: at the end"))
	}
	return out
}

// won is which limit of the use-by time ends first. A stability that the
// formulary gives for any fluid, or for the drug undiluted, names none.
func (s scribe) won() labels.Line {
	name, ok := strings.CutPrefix(s.p.UseBy.Won, "stability, ")
	if !ok {
		return labels.Words(s.p.UseBy.Won)
	}
	fluid, _, _ := strings.Cut(name, ", at ")
	if fluid == "any" || fluid == "neat" {
		return labels.Words("stability at room temperature")
	}
	return joined(labels.Words("stability in "), s.said(fluid), labels.Words(" at room temperature"))
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
		c := sources.cautions(s, s.p.Drug.Cautions)
		if seen[name] || len(c) == 0 {
			continue
		}
		seen[name] = true
		half := (len(c) + 1) / 2
		out = append(out, Part{Syringe: s.p.Number, Blocks: []Block{heading("Notes of the formulary on " + s.drug()),
			Beside{LeftShare: 50, Left: []Block{Cautions{List: c[:half]}}, Right: []Block{Cautions{List: c[half:]}}}}})
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
		left, that := s.say("{left.volume}"), s.say("{left.amount}")
		if !s.f.Has(recheck.LeftVolume) {
			left, that = labels.Words("____________"), labels.Words("in plan.json")
		}
		witness := labels.Words("not asked for")
		if s.p.Drug.Has("controlled") {
			witness = labels.Words("____________")
		}
		t.Rows = append(t.Rows, Row{Syringe: s.p.Number, Cells: []labels.Line{labels.Words(fmt.Sprint(s.p.Number)), labels.Words(s.drug()),
			left, that, labels.Words("____________"), witness}})
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
		blocks = append(blocks, Words{Line: labels.Words(fmt.Sprintf("Syringe %d, %s", l.Number, l.Drug)), Strong: true}, Cautions{List: whyLeftOut(l)})
	}
	return Part{Blocks: append(blocks, Words{Line: labels.Words("The figures of these reasons were not worked again and stand on no paper. To see them, prepare the order with nothing left out."), Small: true})}
}

// whyLeftOut is what spoke against a syringe: each reason once, in the words
// of its code. A syringe that is not made has no second route, so none of its
// figures is printed.
func whyLeftOut(l dilution.LeftOut) []Caution {
	var out []Caution
	for _, code := range l.Reasons.Refusals().Codes() {
		entry, _ := refusal.Lookup(code)
		out = append(out, Caution{Text: labels.Words(entry.Says), Code: string(code)})
	}
	if len(out) == 0 {
		out = append(out, Caution{Text: labels.Words("Nothing spoke against it.")})
	}
	return out
}
