package main

import (
	"fmt"
	"io"
	"strings"

	"drawup/dilution/quantity/lint"
)

// A proof writes one drug so that it can be read against its sources: one fact
// a paragraph, its source below it, nothing cut. Texts in double quotes are
// those that an order repeats letter by letter.
type proof struct{ w io.Writer }

// nameWidth is the column of names in a proof, indent included.
const nameWidth = 20

func (p proof) head(format string, args ...any) {
	fmt.Fprintln(p.w)
	for _, l := range wrap(fmt.Sprintf(format, args...), widest) {
		fmt.Fprintln(p.w, l)
	}
}

// item writes a name and a value; a value that is empty is left out.
func (p proof) item(name, value string) {
	if value == "" {
		return
	}
	for i, l := range wrap(value, widest-nameWidth) {
		if i > 0 {
			name = ""
		}
		fmt.Fprintf(p.w, "%s%s\n", pad("  "+name, nameWidth), l)
	}
}

// sourced writes a name and a value with its source below. Thousands are
// grouped, but not in what an order repeats letter by letter.
func (p proof) sourced(name, value string, s shownSource) {
	if !strings.Contains(value, "\"") {
		value = lint.UK().Grouped(value)
	}
	if s.Unverified {
		value += " (unverified)"
	}
	p.item(name, value)
	source := "source: " + s.Source
	if s.Grade != "" {
		source = "source [" + strings.TrimSuffix(s.Grade+" "+s.Jurisdiction, " ") + "]: " + s.Source
	}
	if s.VerifiedBy != "" {
		source += "; verified by " + s.VerifiedBy
	}
	if s.Reason != "" {
		source += "; loosened because: " + s.Reason
	}
	for i, l := range wrap(source, widest-nameWidth-4) {
		if i > 0 {
			l = "  " + l
		}
		fmt.Fprintf(p.w, "%s%s\n", strings.Repeat(" ", nameWidth+2), l)
	}
}

// figure writes a figure as the file has it; one that is absent is left out.
func (p proof) figure(name string, f *shownFigure) {
	if f != nil {
		p.sourced(name, f.Text, f.shownSource)
	}
}

func (p proof) note(name string, n *shownText) {
	if n != nil {
		p.sourced(name, n.Text, n.shownSource)
	}
}

// firstLine is the state of the data; it stands above everything else.
func firstLine(w io.Writer, h *formularyHead) {
	fmt.Fprintf(w, "%s; version %s, digest %s\n", h.State, h.Version, h.Digest[:12])
}

// showDrug writes all of d.
func showDrug(w io.Writer, doc *drugDocument) {
	d := doc.Drug
	firstLine(w, doc.Formulary)
	p := proof{w}
	p.head("%q", d.Name)
	p.names(d)
	p.note("never as bolus", d.NeverAsBolus)
	p.note("never as infusion", d.NeverAsInfusion)
	if len(d.Cautions) > 0 {
		p.head("notes")
		for i := range d.Cautions {
			p.note(fmt.Sprint(i+1), &d.Cautions[i])
		}
	}
	for _, x := range d.Presentations {
		p.presentation(x)
	}
	p.bounds(d.Concentrations)
	p.rules("dose", d.Doses, d.NeverAsBolus != nil)
	p.rules("infusion", d.Infusions, d.NeverAsInfusion != nil)
	p.local(d.LocalMaxima)
	p.pairs(doc.Pairs)
	p.standards(d.Standards)
	p.stability(d.Stability)
	p.foot()
}

func (p proof) names(d *shownDrug) {
	p.item("other names", strings.Join(d.Also, ", "))
	var on []string
	for _, style := range []string{"uk", "us", "si"} {
		on = append(on, style+" "+d.LabelNames[style])
	}
	p.item("on labels", strings.Join(on, "; "))
	p.item("ATC code", d.ATC)
	p.item("label class", d.Class+", "+d.ClassWord)
	counted := "by " + d.Counted
	if d.CountedAs != "" {
		counted += ", as " + d.CountedAs
	}
	if d.ShowAs {
		counted += ", and labels say so"
	}
	p.item("counted", counted)
	if d.Salt != nil {
		p.item("formula, salt", d.Salt.Formula)
		p.sourced("salt", fmt.Sprintf("%s of %s for each 1 mg as counted", d.Salt.PerMg.Printed, d.Salt.Name), d.Salt.shownSource)
	}
	p.item("formula", d.Formula)
	p.figure("substance", d.Substance)
	p.item("substitutes", strings.Join(d.Substitutes, ", "))
	flags := strings.Join(d.Flags, ", ")
	if flags == "" {
		flags = "none"
	}
	p.item("flags", flags)
	p.item("in the data", fmt.Sprintf("%s: %s, line %d", d.From, d.File, d.Line))
}

func (p proof) presentation(x shownPresentation) {
	p.head("presentation %q", x.ID)
	p.sourced("contents", contentsOf(x), x.shownSource)
	if x.Added != nil {
		p.item("to be mixed", "add "+x.Added.Printed+" of "+strings.Join(quoted(x.AddFluids), " or "))
		switch {
		case x.Displacement == nil && x.Volume != nil:
			p.item("obtained", x.Volume.Printed+" when mixed, as the label says")
		case x.Displacement == nil:
			p.item("displacement", "not stored: no concentration can be worked, so every use is refused")
		}
	}
	p.figure("displacement", x.Displacement)
	p.figure("assay, up to ±", x.Assay)
	use := strings.Join(x.Uses, ", ")
	if x.AgeFrom != "" {
		use += ", from " + x.AgeFrom
	}
	p.item("for", use)
	p.item("bound to routes", strings.Join(x.Routes, ", "))
	if x.MultiDose {
		p.item("multi-dose", "yes")
	}
	p.note("preserved", x.Preserved)
	p.note("not for a pump", x.NotForPump)
	p.figure("overfill", x.Overfill)
	neat := "no, has to be diluted"
	if x.Neat {
		neat = "yes, may be given as it is"
	}
	p.item("neat", neat)
	if len(x.Diluents) == 0 {
		p.item("diluents", "none listed")
	}
	for _, f := range x.Diluents {
		p.fluid("diluent", f)
	}
	for _, f := range x.Forbidden {
		p.fluid("never with", f)
	}
	for i := range x.Notes {
		p.note("note", &x.Notes[i])
	}
}

// contentsOf is what is in the container, and how strong it is to be drawn.
func contentsOf(x shownPresentation) string {
	s := x.Container + ", " + x.Form + ", " + x.Amount.Printed
	if x.SecondName != "" {
		s += " with " + x.SecondAmount.Printed + " of " + x.SecondName
	}
	if x.Volume != nil {
		if x.Added != nil {
			s += ", when mixed"
		}
		s += " in " + x.Volume.Printed
	}
	if x.Concentration != nil {
		s += ", which is " + shown(x.Concentration)
	}
	return s
}

func (p proof) fluid(name string, f shownFluid) {
	value := fmt.Sprintf("%q", f.Text)
	if f.Why != "" {
		value += " (" + f.Why + ")"
	}
	if f.Reason != "" {
		value += ": " + f.Reason
	}
	p.sourced(name, value, f.shownSource)
	p.figure("  only from", f.Low)
	p.figure("  only up to", f.High)
}

// weight writes which weight a row goes by, and where that is said.
func (p proof) weight(by string, source *shownSource) {
	if source != nil {
		p.sourced("goes by", byWords(by), *source)
	} else {
		p.item("goes by", byWords(by))
	}
}

func (p proof) local(list []shownLocal) {
	for _, m := range list {
		with := "without adrenaline"
		if m.WithAdrenaline {
			with = "with adrenaline"
		}
		p.head("local anaesthetic maximum, %s", with)
		ages := m.Ages
		if ages == "" {
			ages = "every age"
		}
		p.item("ages", ages)
		p.weight(m.By, m.BySource)
		p.figure("by weight", m.PerKg)
		p.figure("in all", m.Total)
		p.figure("in a day", m.DayMax)
	}
}

// pairs writes what may share a syringe with the drug, and what never may.
func (p proof) pairs(list []shownText) {
	if len(list) == 0 {
		return
	}
	p.head("in one syringe with another drug (all others are refused)")
	for _, x := range list {
		p.sourced(x.Reason, x.Text, x.shownSource)
	}
}

func (p proof) bounds(list []shownBounds) {
	if len(list) == 0 {
		p.head("concentration: none is stored")
	}
	for _, b := range list {
		p.head("concentration, %s, %s line%s", b.Use, b.Line, tailed(", ", strings.Join(b.Routes, ", "))+tailed(", for ", b.Whom))
		p.figure("at least", b.Low)
		p.figure("at most", b.High)
	}
}

// rules writes all rows of one kind, or that there are none; a drug that must
// never be given that way has said so already.
func (p proof) rules(kind string, list []shownRule, never bool) {
	if len(list) == 0 && !never {
		p.head("%s: no limits are stored", kind)
	}
	for _, r := range list {
		p.rule(kind, r)
	}
}

// rule writes one row of limits.
func (p proof) rule(kind string, r shownRule) {
	p.head("%s for %q", kind, r.For)
	p.item("routes", strings.Join(r.Routes, ", "))
	ages := r.Ages
	if ages == "" {
		ages = "every age"
	}
	p.item("ages", ages)
	p.weight(r.By, r.BySource)
	p.figure("hard, at least", r.HardLow)
	p.figure("usual, from", r.UsualLow)
	p.figure("usual, to", r.UsualHigh)
	p.figure("soft, at most", r.SoftHigh)
	p.figure("hard, at most", r.HardHigh)
	p.figure("in all, at most", r.TotalMax)
	p.figure("first dose", r.FirstMax)
	p.figure("repeat", r.RepeatMax)
	p.figure("repeat after", r.RepeatAfter)
	p.figure("in a day", r.DayMax)
	p.figure("in a course", r.CourseMax)
	p.figure("runs at most", r.Longest)
}

func byWords(by string) string {
	switch by {
	case "none":
		return "none: not by weight"
	case "surface":
		return "body surface area"
	case "actual", "ideal", "adjusted", "lean":
		return by + " weight"
	}
	return by
}

func (p proof) standards(list []shownStandard) {
	for _, s := range list {
		p.head("standard preparation %q", s.ID)
		value := s.Amount.Printed + " in " + s.Volume.Printed
		if s.Concentration != nil {
			value += ", which is " + shown(s.Concentration)
		}
		p.sourced("makes", value, s.shownSource)
		diluent := "none, neat"
		if s.Diluent != "" {
			diluent = fmt.Sprintf("%q", s.Diluent)
		}
		p.item("diluent", diluent)
		p.item("line", s.Line)
		p.item("settled for", strings.TrimPrefix(s.Patients+", "+s.SettledFor, ", "))
	}
}

func (p proof) stability(list []shownStability) {
	if len(list) == 0 {
		p.head("stability: none is stored")
		return
	}
	p.head("stability")
	for _, s := range list {
		p.sourced(s.Time, s.Diluent+", "+s.Storage+tailed(", in a ", s.Container), s.shownSource)
		p.figure("  shown from", s.Low)
		p.figure("  shown up to", s.High)
	}
}

// foot explains the marks.
func (p proof) foot() {
	fmt.Fprint(p.w, `
[A] label, guideline, standard or paper   [B] handbook or hospital guide   [C] weak source
[P] common practice without a source. Nobody has verified what is marked unverified.
A soft limit passes with a named person and a reason, a hard limit never does.
What stands in double quotes is written the same way in an order. What is not here is refused.
`)
}

func quoted(list []string) []string {
	var out []string
	for _, s := range list {
		out = append(out, fmt.Sprintf("%q", s))
	}
	return out
}
