package sheets

import (
	"strings"

	"drawup/dilution"
	"drawup/dilution/body"
	"drawup/dilution/formulary"
	"drawup/dilution/recheck"
	"drawup/labels"
)

// openParts is the preparer's page: the figures to compare, the working, the
// limits that were checked, the cautions, the sources.
func (s scribe) openParts(list dilution.List) []Part {
	n := s.p.Number
	var sources sourceList
	sources.record(s, list.Formulary)
	limits := s.limits(&sources)
	parts := []Part{
		{n, []Block{s.name(s.say(s.concentration()), labels.Words(s.patient()), false), s.compare(), Words{Line: s.agreement(), Small: true}}},
		{n, []Block{heading("Working"), Steps{List: s.working(), Plain: true}}},
		{n, []Block{heading("Limits checked"), limits}},
	}
	if by := s.p.Order.AcceptedBy; by.Given() {
		parts = append(parts, Part{n, []Block{heading("Soft limit"), Pairs{List: []Pair{words("accepted by", by.Value), words("because", s.p.Order.AcceptedReason.Value)}}}})
	}
	if c := s.cautions(list); len(c) > 0 {
		parts = append(parts, Part{n, []Block{heading("Cautions"), Cautions{List: c}}})
	}
	if p := sources.part(n); len(p.Blocks) > 0 {
		parts = append(parts, p)
	}
	return parts
}

// compare is the figures in the order of the boxes of the page before.
func (s scribe) compare() Table {
	t := Table{Box: true, Columns: []Column{{Head: "tick if the same", Share: 70}, {Head: "preparer's figure", Share: 110}}}
	add := func(key, pattern string) {
		t.Rows = append(t.Rows, Row{Strong: true, Cells: []labels.Line{s.say(key), s.say(pattern)}})
	}
	if s.p.Mixture.Mixed() {
		t.Rows = append(t.Rows, Row{Strong: true, Cells: []labels.Line{labels.Words("containers opened"), s.opened()}})
	} else {
		add(s.p.Presentation.Container, s.contents())
		add("containers opened", "{container.count}")
	}
	if s.f.Has(recheck.PowderAdded) {
		add("fluid added to each", "{powder.added} of {="+s.p.Mixture.AddFluid+"}")
	}
	if s.f.Has(recheck.DoseWeight) {
		add(scalarWord(s.p.Dose.Surface.Given(), "{dose.weight.by}"), "{dose.weight}")
	}
	if s.f.Has(recheck.RateWeight) {
		add(scalarWord(s.p.Infusion.Surface.Given(), "{rate.weight.by}"), "{rate.weight}")
	}
	add("drug volume", "{drug.volume}, {drug.barrel} syringe")
	if s.p.Mixture.Method != dilution.Neat {
		add("diluent", "{diluent.volume} of {="+s.p.Mixture.Diluent+"}")
	}
	add("final volume", s.fill())
	add("amount in it", "{amount}")
	add("concentration", s.concentration())
	if s.p.Dose != nil {
		add("one dose, amount", "{dose.amount}; the syringe gives {dose.delivered}")
		add("one dose, volume", "{dose.volume}")
	}
	if s.p.Order.Doses.Given() {
		t.Rows = append(t.Rows, Row{Strong: true, Cells: []labels.Line{labels.Words("doses in it"), s.doses()}})
	}
	if s.p.Infusion != nil {
		add("pump rate for the start", "{start.rate}")
		add("dose rate it gives", "{start.delivered}; ordered {start.dose}")
	}
	add("use by", "{use.by}")
	return t
}

func scalarWord(surface bool, by string) string {
	if surface {
		return "body surface"
	}
	return by + " weight"
}

func (s scribe) fill() string {
	if s.bag() {
		return "{final.volume}, in a bag"
	}
	return "{final.volume}, {final.barrel} syringe"
}

// agreement says when two figures agree.
func (s scribe) agreement() labels.Line {
	pattern := "Agreement is: drug volume within one graduation, {drug.step}"
	if s.f.Has(recheck.DoseStep) {
		pattern += "; dose volume within {dose.step}"
	}
	if s.f.Has(recheck.RateStep) {
		pattern += "; pump rate within one step, {rate.step}"
	}
	return joined(s.say(pattern), labels.Words("; the same value in another unit is the same. Common practice, no source."))
}

// A limitTable is written row by row: what the limit is, its figure, where it
// comes from.
type limitTable struct {
	s       scribe
	sources *sourceList
	table   Table
}

func (t *limitTable) add(what string, figure labels.Line, from string) {
	t.table.Rows = append(t.table.Rows, Row{Cells: []labels.Line{labels.Words(what), figure, labels.Words(from)}})
}

// addLimit adds one limit in the house style (rule R14), behind a word that
// says which way it binds; nothing for a blank.
func addLimit[T any](t *limitTable, what, binds string, fig formulary.Figure[T], print func(T) string) {
	if fig.Given() {
		t.add(what, t.s.bound(binds+styled(fig.Text, print(fig.Value))), t.sources.mark(fig.Source, fig.Unverified))
	}
}

// styled is a limit as the house style prints it. A limit is never rounded: one
// with more digits than the style prints exactly, or that is a word, stays as
// the formulary writes it.
func styled(raw, printed string) string {
	number, _, _ := strings.Cut(raw, " ")
	digits := strings.Trim(strings.ReplaceAll(number, ".", ""), "0")
	if printed == "" || len(digits) > 4 {
		return raw
	}
	return printed
}

// words adds words of the formulary.
func (t *limitTable) words(what, text string, source formulary.Source, unverified bool) {
	t.add(what, t.s.said(text), t.sources.mark(source, unverified))
}

// limits are the rows of the formulary that the order was held against.
func (s scribe) limits(sources *sourceList) Table {
	t := &limitTable{s: s, sources: sources, table: Table{Small: true, Columns: []Column{{Head: "limit", Share: 62}, {Head: "figure", Share: 58}, {Head: "from", Share: 60}}}}
	if d := s.p.Dose; d != nil {
		addLimits(t, "dose", d.Rule, s.p.Style.Dose)
		addLimit(t, "dose, most at once", upTo, d.Rule.TotalMax, s.p.Style.Amount)
	}
	use := "bolus"
	if s.p.Order.Infusion {
		use = "infusion"
	}
	if s.p.Infusion != nil {
		addLimits(t, "dose rate", s.p.Infusion.Rule, s.p.Style.DoseRate)
	}
	for _, b := range s.bounds(use) {
		what := "concentration, " + use + ", " + b.Line + " line"
		addLimit(t, what+", lowest", from, b.Low, s.p.Style.Concentration)
		addLimit(t, what+", highest", upTo, b.High, s.p.Style.Concentration)
	}
	s.packLimits(t)
	return t.table
}

// packLimits are the rows on the container, its diluent and the standard
// preparation.
func (s scribe) packLimits(t *limitTable) {
	pr := s.p.Presentation
	t.words("contents of the container", pr.ID, pr.Source, pr.Unverified)
	for _, pack := range s.p.Mixture.Packs {
		if p := pack.Presentation; p.ID != pr.ID {
			t.words("contents of the container", p.ID, p.Source, p.Unverified)
		}
	}
	addLimit(t, "volume of the powder itself", "", pr.Displacement, s.p.Style.Volume)
	for _, d := range pr.Diluents {
		if d.Name == s.p.Mixture.Diluent {
			t.words("diluent", d.Name, d.Source, d.Unverified)
		}
	}
	if std, ok := s.p.Drug.Standard(s.p.Standard); ok && s.p.Standard != "" {
		t.words("standard preparation", std.ID, std.Source, std.Unverified)
	}
}

// bounds are the rows for this use: those for the very line, else for any.
func (s scribe) bounds(use string) []formulary.Bounds {
	line := "peripheral"
	if s.p.Order.Line.Given() {
		line = s.p.Order.Line.Value
	}
	var own, any []formulary.Bounds
	for _, b := range s.p.Drug.Bounds {
		switch {
		case b.Use == use && b.Line == line:
			own = append(own, b)
		case b.Use == use && b.Line == "any":
			any = append(any, b)
		}
	}
	if len(own) > 0 {
		return own
	}
	return any
}

// addLimits adds the figures of one row of limits; where no hard limit is
// stored it says so.
func addLimits[T any](t *limitTable, what string, r formulary.Rule[T], print func(T) string) {
	by := r.By.String() + " weight"
	switch r.By {
	case body.Surface:
		by = "body surface"
	case body.None:
		by = "no weight"
	case body.Actual, body.Ideal, body.Adjusted, body.Lean:
	}
	source := "no source"
	if r.BySource.Title != "" {
		source = t.sources.mark(r.BySource, false)
	}
	t.add(what+" for", t.s.said(ruleName(r.For, r.Ages())), "goes by "+by+", "+source)
	for _, x := range limitRows(r) {
		addLimit(t, what+", "+x.name, x.binds, x.fig, print)
	}
	if !r.HardHigh.Given() {
		t.add(what+", hard highest", labels.Words("none stored"), "the highest stored figure is the limit")
	}
}

func ruleName(purpose, ages string) string {
	if ages == "" {
		return purpose
	}
	return purpose + ", " + ages
}
