package sheets

import (
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
		parts = append(parts, Part{n, []Block{heading("Cautions"), Cautions{c}}})
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
	add(s.p.Presentation.Container, s.contents())
	add("containers opened", "{container.count}")
	if s.f.Has(recheck.PowderAdded) {
		add("fluid added to each", "{powder.added} of "+s.p.Mixture.AddFluid)
	}
	if s.f.Has(recheck.DoseWeight) {
		add(scalarWord(s.p.Dose.Surface.Given(), "{dose.weight.by}"), "{dose.weight}")
	}
	if s.f.Has(recheck.RateWeight) {
		add(scalarWord(s.p.Infusion.Surface.Given(), "{rate.weight.by}"), "{rate.weight}")
	}
	add("drug volume", "{drug.volume}, {drug.barrel} syringe")
	if s.p.Mixture.Method != dilution.Neat {
		add("diluent", "{diluent.volume} of "+s.p.Mixture.Diluent)
	}
	add("final volume", s.fill())
	add("amount in it", "{amount}")
	add("concentration", s.concentration())
	if s.p.Dose != nil {
		add("one dose, amount", "{dose.amount}; the syringe gives {dose.delivered}")
		add("one dose, volume", "{dose.volume}")
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

// limits are the rows of the formulary that the order was held against.
func (s scribe) limits(sources *sourceList) Table {
	t := Table{Small: true, Columns: []Column{{Head: "limit", Share: 62}, {Head: "figure", Share: 58}, {Head: "from", Share: 60}}}
	add := func(what, figure, from string) {
		t.Rows = append(t.Rows, Row{Cells: []labels.Line{labels.Words(what), labels.Words(figure), labels.Words(from)}})
	}
	s.doseLimits(sources, add)
	s.rateLimits(sources, add)
	use := "bolus"
	if s.p.Order.Infusion {
		use = "infusion"
	}
	for _, b := range s.bounds(use) {
		what := "concentration, " + use + ", " + b.Line + " line"
		if b.Low.Given() {
			add(what+", lowest", b.Low.Text, sources.mark(b.Low.Source, b.Low.Unverified))
		}
		if b.High.Given() {
			add(what+", highest", b.High.Text, sources.mark(b.High.Source, b.High.Unverified))
		}
	}
	pr := s.p.Presentation
	add("contents of the container", pr.ID, sources.mark(pr.Source, pr.Unverified))
	if pr.Displacement.Given() {
		add("volume of the powder itself", pr.Displacement.Text, sources.mark(pr.Displacement.Source, pr.Displacement.Unverified))
	}
	for _, d := range pr.Diluents {
		if d.Name == s.p.Mixture.Diluent {
			add("diluent", d.Name, sources.mark(d.Source, d.Unverified))
		}
	}
	if std, ok := s.p.Drug.Standard(s.p.Standard); ok && s.p.Standard != "" {
		add("standard preparation", std.ID, sources.mark(std.Source, std.Unverified))
	}
	return t
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

func (s scribe) doseLimits(sources *sourceList, add func(what, figure, from string)) {
	d := s.p.Dose
	if d == nil {
		return
	}
	addLimits("dose", d.Rule, sources, add)
	if m := d.Rule.TotalMax; m.Given() {
		add("dose, most at once", m.Text, sources.mark(m.Source, m.Unverified))
	}
}

func (s scribe) rateLimits(sources *sourceList, add func(what, figure, from string)) {
	if s.p.Infusion != nil {
		addLimits("dose rate", s.p.Infusion.Rule, sources, add)
	}
}

// addLimits adds the figures of one row of limits; where no hard limit is
// stored it says so.
func addLimits[T any](what string, r formulary.Rule[T], sources *sourceList, add func(what, figure, from string)) {
	by := r.By.String() + " weight"
	switch r.By {
	case body.Surface:
		by = "body surface"
	case body.None:
		by = "no weight"
	case body.Actual, body.Ideal, body.Adjusted, body.Lean:
	}
	from := "no source"
	if r.BySource.Title != "" {
		from = sources.mark(r.BySource, false)
	}
	add(what+" for", ruleName(r.For, r.Ages()), "goes by "+by+", "+from)
	for _, x := range limitRows(r) {
		if x.fig.Given() {
			add(what+", "+x.name, x.fig.Text, sources.mark(x.fig.Source, x.fig.Unverified))
		}
	}
	if !r.HardHigh.Given() {
		add(what+", hard highest", "none stored", "the highest stored figure is the limit")
	}
}

func ruleName(purpose, ages string) string {
	if ages == "" {
		return purpose
	}
	return purpose + ", " + ages
}
