// Package verify holds a formulary against itself and against chemistry: what
// the reader cannot see because each figure by itself reads well. It finds
// slips; it cannot tell whether a figure is right.
//
// The bounds of what is plausible are our own choice, wide on purpose: they
// catch a unit or a decimal point that slipped, not an unusual practice.
package verify

import (
	"fmt"

	"drawup/dilution/formulary"
	"drawup/dilution/refusal"
)

// Check lists every finding in f, each with its place. Findings are refusals:
// a file that has one should not be used.
func Check(f *formulary.Formulary) refusal.List {
	var all refusal.List
	for _, d := range f.Drugs() {
		c := &check{drug: d}
		if c.kinds(); len(c.found) > 0 {
			all = append(all, c.found...)
			continue // figures that count different things cannot be compared
		}
		for _, step := range []func(){
			c.jurisdictions, c.words, c.names, c.contents, c.powders, c.assays, c.factors, c.strengths, c.bounds, c.mixtures,
			c.doses, c.rates, c.overlaps, c.maxima, c.courses, c.standards, c.stability, c.times, c.wording,
		} {
			step()
		}
		all = append(all, c.found...)
	}
	all = append(all, pairs(f)...)
	all.Sort()
	return all
}

// check is one drug at work.
type check struct {
	drug  formulary.Drug
	found refusal.List
	seen  map[string]bool // sources already reported
}

// find adds a finding.
func (c *check) find(code refusal.Code, pos refusal.Pos, field, got, want, format string, args ...any) {
	if pos.Line == 0 {
		pos = c.drug.Pos
	}
	c.found = append(c.found, refusal.Reason{
		Code: code, Severity: refusal.Refuse, Field: field, Got: got, Want: want, Rule: "R13", Pos: pos,
		Message: c.drug.Name + ": " + fmt.Sprintf(format, args...),
		Remedy:  "hold it against the source, and mend the file or the source",
	})
}

// jurisdictions wants to know of every source where it holds.
func (c *check) jurisdictions() {
	c.seen = map[string]bool{}
	for _, e := range c.drug.Entries() {
		s := e.Source
		if s.Key == "" || s.Jurisdiction != "" || c.seen[s.Key] {
			continue
		}
		c.seen[s.Key] = true
		c.find(refusal.SourceNowhere, e.Pos, "jurisdiction", s.Key, `jurisdiction = "UK" or another in the list of sources`,
			"the source %s does not say where it holds", s.Key)
	}
}
