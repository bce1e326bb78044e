package verify

import (
	"fmt"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity/lint"
	"drawup/dilution/refusal"
)

// wording holds the record's own sentences against the rules of numbers and
// units (rule R14): papers print them word for word. A formulary has no house
// style, so only what no house style would print is a finding. Names of
// containers and fluids and titles of documents are quoted and not judged.
func (c *check) wording() {
	judge := func(notes ...formulary.Note) {
		for _, n := range notes {
			c.misread(n.Text, n.Pos)
		}
	}
	one := func(n *formulary.Note) {
		if n != nil {
			judge(*n)
		}
	}
	d := c.drug
	judge(d.Cautions...)
	one(d.NeverAsInfusion)
	one(d.NeverAsBolus)
	for _, p := range d.Presentations {
		judge(p.Notes...)
		one(p.Preserved)
		one(p.NotForPump)
		for _, x := range append(append([]formulary.Diluent{}, p.Diluents...), p.Forbidden...) {
			c.misread(x.Reason, x.Pos)
		}
	}
}

// misread reports what every house style stops in a text.
func (c *check) misread(text string, pos refusal.Pos) {
	for _, f := range lint.UK().Printed(text) {
		if f.Severity != lint.Stop || !inEvery(text, f) {
			continue
		}
		want := f.Rule.Says
		if f.Fix != "" {
			want = fmt.Sprintf("%q", f.Fix)
		}
		c.find(refusal.TextMisread, pos, "text", f.Got, want, "a sentence has %s: %q", f.Rule.Fault, f.Got)
		last := &c.found[len(c.found)-1]
		last.Rule, last.Source, last.Remedy = "R14, "+f.Rule.Code, f.Rule.Source, "write it as the rule says"
	}
}

// inEvery reports a finding that each house style stops.
func inEvery(text string, want lint.Finding) bool {
	for _, h := range lint.Houses() {
		found := false
		for _, f := range h.Printed(text) {
			found = found || f.Rule.Code == want.Rule.Code && f.At == want.At && f.Severity == lint.Stop
		}
		if !found {
			return false
		}
	}
	return true
}
