package main

import (
	"bytes"
	"encoding/json"
	"fmt"
	"os"
	"path/filepath"
	"regexp"
	"slices"
	"strings"
	"testing"
	"unicode/utf8"

	"github.com/pelletier/go-toml/v2"

	"drawup/dilution/quantity"
)

// asked runs drawup formulary and returns what it printed.
func asked(t *testing.T, want int, args ...string) (string, string) {
	t.Helper()
	var out, faults bytes.Buffer
	if code := run(append([]string{"formulary"}, args...), strings.NewReader(""), &out, &faults); code != want {
		t.Fatalf("%q: got exit %d, want %d: %s", args, code, want, faults.String())
	}
	return out.String(), faults.String()
}

// A starterFile is one file of the starter formulary, read by a general TOML
// reader and nothing of ours.
type starterFile struct {
	Sources map[string]struct{ Title, Grade, Jurisdiction string }
	Drugs   []map[string]any `toml:"drug"`
}

func starterFiles(t *testing.T) []starterFile {
	t.Helper()
	names, err := filepath.Glob("../../dilution/formulary/starter/*.toml")
	if err != nil || len(names) < 8 {
		t.Fatalf("got %d files (%v)", len(names), err)
	}
	var out []starterFile
	for _, name := range names {
		data, err := os.ReadFile(name)
		if err != nil {
			t.Fatal(err)
		}
		var f starterFile
		if err := toml.Unmarshal(data, &f); err != nil {
			t.Fatalf("%s: %v", name, err)
		}
		out = append(out, f)
	}
	return out
}

// oneLineOf is a text without its line breaks, its columns and the signs between
// thousands, which paper has and the files have not.
func oneLineOf(s string) string {
	return thousands.ReplaceAllString(strings.Join(strings.Fields(s), " "), "$1$2")
}

var thousands = regexp.MustCompile(`(\d),(\d{3})`)

// TestEveryDrugIsShown holds each drug's page against the formulary file, read
// by a general TOML reader: every text of the file stands on the page, and every
// figure has its own source behind it, spelled out, and the mark of one that
// nobody verified (rule R13).
func TestEveryDrugIsShown(t *testing.T) {
	drugs, facts := 0, 0
	list, _ := asked(t, exitMade, "list")
	for _, file := range starterFiles(t) {
		for _, d := range file.Drugs {
			name := d["name"].(string)
			if !strings.Contains(list, "\n"+name+" ") {
				t.Errorf("%s is not in the list", name)
			}
			page, _ := asked(t, exitMade, "show", name)
			if !strings.HasPrefix(page, "starter formulary, not approved for use here; version 2026.12, digest ") {
				t.Errorf("%s: got first line %q", name, strings.SplitN(page, "\n", 2)[0])
			}
			p := &heldPage{t: t, drug: name, text: oneLineOf(page), file: file}
			p.hold(d, "drug")
			drugs, facts = drugs+1, facts+p.facts
			for _, l := range strings.Split(page, "\n") {
				if n := utf8.RuneCountInString(l); n > widest {
					t.Errorf("%s: got a line of %d characters: %s", name, n, l)
				}
			}
		}
	}
	if drugs < 32 || facts < 1000 {
		t.Errorf("got %d drugs and %d sourced facts", drugs, facts)
	}
}

// heldPage is one page and the file that it is held against.
type heldPage struct {
	t     *testing.T
	drug  string
	text  string
	file  starterFile
	facts int // sourced facts found
}

// sourceText is how a page spells a source out.
func (p *heldPage) sourceText(key string) string {
	s, ok := p.file.Sources[key]
	if !ok {
		p.t.Errorf("%s: the file has no source %q", p.drug, key)
	}
	return oneLineOf(fmt.Sprintf("source [%s]: %s", strings.TrimSpace(s.Grade+" "+s.Jurisdiction), s.Title))
}

// hold walks a table of the file.
func (p *heldPage) hold(table map[string]any, where string) {
	if key, ok := table["source"].(string); ok {
		p.sourced(table, key, where)
	}
	for name, v := range table {
		at := where + "." + name
		switch x := v.(type) {
		case bool:
			p.marked(name, x, at)
		case string:
			p.held(name, x, at)
		case map[string]any:
			p.hold(x, at)
		case []any:
			for _, one := range x {
				if inner, ok := one.(map[string]any); ok {
					p.hold(inner, at)
				} else {
					p.held(name, fmt.Sprint(one), at)
				}
			}
		}
	}
}

// marked wants what the file answers with yes or no.
func (p *heldPage) marked(name string, on bool, at string) {
	want := ""
	switch {
	case name == "neat" && on:
		want = "neat yes, "
	case name == "neat":
		want = "neat no, "
	case name == "multi_dose" && on:
		want = "multi-dose yes"
	case name == "frail" && on:
		want = "the frail"
	case name == "with_adrenaline" && on:
		want = "maximum, with adrenaline"
	case name == "with_adrenaline":
		want = "maximum, without adrenaline"
	case name == "multi_dose" || name == "frail":
		return
	case name == "show_as" && on:
		want = "and labels say so"
	case name == "show_as" || name == "unverified": // sourced looks for the latter
		return
	default:
		p.t.Errorf("%s: %s: the test does not know this key", p.drug, at)
	}
	if !strings.Contains(p.text, want) {
		p.t.Errorf("%s: %s: the page does not say %q", p.drug, at, want)
	}
}

// held wants a text of the file on the page. Quantities that name a container's
// contents are printed in house style, so the same quantity is wanted there.
func (p *heldPage) held(name, text, at string) {
	want := []string{text}
	switch name {
	case "source":
		return
	case "by_source":
		want = []string{p.sourceText(text)}
	case "amount", "second_amount", "per_mg":
		a, err := quantity.ParseAmount(text)
		if err != nil {
			p.t.Fatalf("%s %s: %v", p.drug, at, err)
		}
		want = append(want, quantity.UK().AmountIn(a, a.Best()))
	case "mix":
		a, v, err := quantity.ParseMix(text)
		if err != nil {
			p.t.Fatalf("%s %s: %v", p.drug, at, err)
		}
		want = append(want, quantity.UK().AmountIn(a, a.Best())+" in "+quantity.UK().Volume(v))
	case "volume", "add":
		v, err := quantity.ParseVolume(text)
		if err != nil {
			p.t.Fatalf("%s %s: %v", p.drug, at, err)
		}
		want = append(want, quantity.UK().Volume(v))
	case "id", "for":
		want = []string{fmt.Sprintf("%q", text)}
		if strings.Contains(at, "concentration") {
			want = []string{", for " + text}
		}
	case "by":
		want = []string{"goes by " + byWords(text)}
	case "jurisdiction": // of a standard preparation, with or without whom it is for
		want = []string{"settled for " + text, "settled for adults, " + text, "settled for children, " + text, "settled for newborns, " + text}
	case "patients":
		want = []string{"settled for " + text + ", "}
	case "why":
		want = []string{"(" + text + ")"}
	case "atc":
		want = []string{"ATC code " + text}
	case "age_from", "age_to":
		want = []string{map[string]string{"age_from": "from ", "age_to": "under "}[name] + text}
	case "line":
		want = []string{text + " line"}
		if strings.Contains(at, "standard") {
			want = []string{"line " + text}
		}
	}
	for _, w := range want {
		if strings.Contains(p.text, oneLineOf(w)) {
			return
		}
	}
	p.t.Errorf("%s: %s: the page does not say %q", p.drug, at, want)
}

// sourced wants the source right behind the fact, and the mark where the file
// has it or the source is weak.
func (p *heldPage) sourced(table map[string]any, key, where string) {
	p.facts++
	mark := ""
	grade := p.file.Sources[key].Grade
	if on, _ := table["unverified"].(bool); on || grade == "C" || grade == "P" {
		mark = " (unverified)"
	}
	fact := ""
	for _, k := range []string{"value", "text", "reason", "name"} {
		if s, ok := table[k].(string); ok {
			fact = s
			if k == "name" && table["per_mg"] == nil {
				fact = fmt.Sprintf("%q", s)
			} else if k == "name" {
				fact = s + " for each 1 mg as counted"
			}
			break
		}
	}
	want := oneLineOf(nameOnPage(where) + fact + mark + " " + p.sourceText(key))
	if !strings.Contains(p.text, want) {
		p.t.Errorf("%s: %s: the page does not say %q", p.drug, where, want)
	}
}

// nameOnPage is the word that must stand before a fact of this key: a low limit
// printed as a high one would be worse than none.
func nameOnPage(where string) string {
	key := where[strings.LastIndex(where, ".")+1:]
	for tail, name := range map[string]string{"diluent.low": "only from ", "diluent.high": "only up to ", "stability.low": "shown from ",
		"stability.high": "shown up to ", "local_maximum.per_kg": "by weight ", "local_maximum.total": "in all "} {
		if strings.HasSuffix(where, tail) {
			return name
		}
	}
	return map[string]string{"first_max": "first dose ", "repeat_max": "repeat ", "repeat_after": "repeat after ", "day_max": "in a day ",
		"course_max": "in a course ", "longest": "runs at most ", "overfill": "overfill ", "preserved": "preserved ", "not_for_pump": "not for a pump ",
		"hard_low": "hard, at least ", "usual_low": "usual, from ", "usual_high": "usual, to ", "soft_high": "soft, at most ",
		"hard_high": "hard, at most ", "total_max": "in all, at most ", "low": "at least ", "high": "at most ", "assay": "assay, up to ± ",
		"displacement": "displacement ", "substance": "substance ", "diluent": "diluent ",
		"never_as_bolus": "never as bolus ", "never_as_infusion": "never as infusion "}[key]
}

// The same page as a document: every key of a shown drug that is a list is a
// list, and the figures are read the way an order would be.
func TestFormularyDocument(t *testing.T) {
	text, _ := asked(t, exitMade, "show", "norepinephrine", "--json")
	var doc struct {
		Formulary struct{ State, Version, Digest string }
		Drug      map[string]any
		Refusals  []any
		Cautions  []any
	}
	if err := json.Unmarshal([]byte(text), &doc); err != nil {
		t.Fatal(err)
	}
	if doc.Formulary.State != "starter formulary, not approved for use here" || len(doc.Formulary.Digest) != 64 || doc.Refusals == nil || doc.Cautions == nil {
		t.Errorf("got %+v", doc)
	}
	for _, key := range []string{"also", "flags", "drug_cautions", "presentations", "concentrations", "doses", "infusions", "standards", "stability"} {
		if _, ok := doc.Drug[key].([]any); !ok {
			t.Errorf("%s is no list: %v", key, doc.Drug[key])
		}
	}
	// Noradrenaline 4, 8 and 16 mg in 50 mL, and 8, 16 and 32 mg in 100 mL, are 80, 160
	// and 320 micrograms/mL (Intensive Care Society and Faculty of Intensive Care
	// Medicine, 2016).
	var got []string
	for _, s := range doc.Drug["standards"].([]any) {
		c := s.(map[string]any)["concentration"].(map[string]any)
		got = append(got, fmt.Sprint(c["exact"], " ", c["unit"]))
	}
	three := []string{"80 microgram/mL", "160 microgram/mL", "320 microgram/mL"}
	if want := slices.Concat(three, three); !slices.Equal(got, want) {
		t.Errorf("got %q, want %q", got, want)
	}
}

// The list is in order of name, one line a drug, and no line is too wide; where
// no drug passes the filters it is an empty list.
func TestFormularyList(t *testing.T) {
	text, _ := asked(t, exitMade, "list", "--json")
	var doc struct{ Drugs []listedDrug }
	if err := json.Unmarshal([]byte(text), &doc); err != nil {
		t.Fatal(err)
	}
	if len(doc.Drugs) < 32 || !slices.IsSortedFunc(doc.Drugs, func(a, b listedDrug) int { return strings.Compare(a.Name, b.Name) }) {
		t.Errorf("got %d drugs, want all in order of name", len(doc.Drugs))
	}
	list, _ := asked(t, exitMade, "list")
	for _, d := range doc.Drugs {
		// Two blanks end the column: one name may begin another, "dexamethasone phosphate".
		if d.ClassWord == "" || strings.Count(list, "\n"+d.Name+"  ") != 1 {
			t.Errorf("%s: got class word %q and not one line", d.Name, d.ClassWord)
		}
		for _, f := range d.Flags {
			if len(markOf(f)) != 2 || !strings.Contains(list, markOf(f)+" "+f) {
				t.Errorf("%s: the flag %q is not spelled out", d.Name, f)
			}
		}
	}
	for _, l := range strings.Split(list, "\n") {
		if n := utf8.RuneCountInString(l); n > widest {
			t.Errorf("got a line of %d characters: %s", n, l)
		}
	}
	if none, _ := asked(t, exitMade, "list", "--class", "pro", "--flag", "HA", "--json"); !strings.Contains(none, `"drugs": []`) {
		t.Errorf("got %s", none)
	}
}

// Every refusal has a code, a field and a way out, and no answer stands beside it.
func TestFormularyRefuses(t *testing.T) {
	for _, c := range []struct {
		exit int
		code string
		args []string
	}{
		{exitUnreadable, "flag-missing", nil},
		{exitUnreadable, "flag-unknown", []string{"lst"}},
		{exitUnreadable, "flag-unknown", []string{"list", "propofol"}},
		{exitUnreadable, "flag-unknown", []string{"list", "--colour", "red"}},
		{exitUnreadable, "flag-missing", []string{"show"}},
		{exitUnreadable, "flags-contradict", []string{"show", "propofol", "--class", "IND"}},
		{exitUnreadable, "flags-contradict", []string{"list", "--class", "IND", "--class", "NMB"}},
		{exitRefused, "value-unknown", []string{"list", "--class", "IDN"}},
		{exitRefused, "drug-unknown", []string{"show", "noradenaline"}},
		{exitRefused, "drug-unknown", []string{"show", "propofol", "ketamine"}},
	} {
		text, told := asked(t, c.exit, append(c.args, "--json")...)
		var doc struct {
			findings
			Drug  any
			Drugs any
		}
		if err := json.Unmarshal([]byte(text), &doc); err != nil {
			t.Fatal(err)
		}
		if len(doc.Refusals) != 1 || doc.Refusals[0].Code != c.code || doc.Refusals[0].Field == "" || doc.Refusals[0].Remedy == "" || doc.Drug != nil || doc.Drugs != nil {
			t.Errorf("%q: got %+v, want one %s", c.args, doc, c.code)
		}
		if !strings.Contains(told, "drawup: refused: "+c.code+"\n") {
			t.Errorf("%q: got %q on standard error", c.args, told)
		}
	}
}
