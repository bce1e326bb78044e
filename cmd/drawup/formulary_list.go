package main

import (
	"fmt"
	"io"
	"slices"
	"strings"
	"time"
	"unicode/utf8"

	"drawup/dilution/formulary"
	"drawup/dilution/refusal"
)

// runFormularyList writes one line a drug.
func runFormularyList(e env, r *formularyRequest) int {
	doc := &drugsDocument{}
	faults := append(r.checkClass(), r.checkFlag()...)
	f, more := r.open(e)
	if faults = append(faults, more...); faults.Refused() {
		return finish(e, r.json, doc, nil, faults)
	}
	doc.Formulary, doc.Drugs = headOf(f), []listedDrug{}
	for _, d := range f.Drugs() {
		if r.wants(d) {
			doc.Drugs = append(doc.Drugs, listedOf(d))
		}
	}
	return finish(e, r.json, doc, func(w io.Writer) { tellDrugs(w, doc) }, nil)
}

// wants reports whether the list is to hold the drug: its class, its mark, and
// a source or a standard preparation of the jurisdiction.
func (r *formularyRequest) wants(d formulary.Drug) bool {
	if r.class.given && d.Class != r.class.text || r.flag.given && !d.Has(r.flag.text) {
		return false
	}
	if !r.jurisdiction.given {
		return true
	}
	return slices.ContainsFunc(d.Entries(), func(x formulary.Entry) bool { return x.Source.Jurisdiction == r.jurisdiction.text }) ||
		slices.ContainsFunc(d.Standards, func(s formulary.Standard) bool { return s.Jurisdiction == r.jurisdiction.text })
}

// checkFlag wants a mark that drugs have.
func (r *formularyRequest) checkFlag() refusal.List {
	if !r.flag.given {
		return nil
	}
	r.flag.text = strings.ToLower(strings.TrimSpace(r.flag.text))
	for _, f := range formulary.Flags() {
		if r.flag.text == f || strings.EqualFold(r.flag.text, markOf(f)) {
			r.flag.text = f
			return nil
		}
	}
	want := strings.Join(formulary.Flags(), ", ")
	return refusal.List{{Code: refusal.ValueUnknown, Severity: refusal.Refuse, Field: "--flag", Got: r.flag.text, Want: "one of " + want,
		Message: fmt.Sprintf("--flag: got %q, want a mark of a drug", r.flag.text), Remedy: "the marks are " + want}}
}

// day is the day of the work: --at, or today.
func (r *formularyRequest) day(e env) (time.Time, refusal.List) {
	if !r.at.given {
		return e.now(), nil
	}
	for _, form := range []string{"2006-01-02", "2006-01-02 15:04"} {
		if t, err := time.Parse(form, r.at.text); err == nil {
			return t, nil
		}
	}
	return time.Time{}, refusal.List{{Code: refusal.TimeMalformed, Severity: refusal.Refuse, Field: "--at", Got: r.at.text, Want: `a day such as "2026-12-01"`,
		Rule: "R18", Message: fmt.Sprintf("%q is not a day", r.at.text), Remedy: `write --at "2026-12-01"`}}
}

// Widths of the columns of the list, with two blanks between them. With the
// longest row of marks they stay within widest; a test measures it.
const (
	nameColumn  = 31
	alsoColumn  = 18
	classColumn = 31
)

// tellDrugs writes one line a drug. Nothing is cut: other names that find no
// room are counted, and formulary show has them all.
func tellDrugs(w io.Writer, doc *drugsDocument) {
	firstLine(w, doc.Formulary)
	fmt.Fprintln(w)
	if len(doc.Drugs) == 0 {
		fmt.Fprintln(w, "no drug of this class")
		return
	}
	cells := func(name, also, class, flags string) {
		line := pad(name, nameColumn+2) + pad(also, alsoColumn+2) + pad(class, classColumn+2) + flags
		fmt.Fprintln(w, strings.TrimRight(line, " "))
	}
	cells("drug", "other names", "class", "flags")
	used := map[string]bool{}
	for _, d := range doc.Drugs {
		var marks []string
		for _, f := range d.Flags {
			used[f] = true
			marks = append(marks, markOf(f))
		}
		cells(d.Name, shortNames(d.Also, alsoColumn), d.Class+" "+d.ClassWord, strings.Join(marks, " "))
	}
	tellMarks(w, used)
	fmt.Fprintln(w, "\nType drawup formulary show DRUG for all that is stored of one drug, with its sources.")
}

// tellMarks spells out the marks that were used, three in a line.
func tellMarks(w io.Writer, used map[string]bool) {
	var flags []string
	for f := range used {
		flags = append(flags, f)
	}
	slices.SortFunc(flags, func(a, b string) int { return strings.Compare(markOf(a), markOf(b)) })
	if len(flags) > 0 {
		fmt.Fprintln(w)
	}
	for three := range slices.Chunk(flags, 3) {
		line := ""
		for _, f := range three {
			line += pad(markOf(f)+" "+f, 34)
		}
		fmt.Fprintln(w, strings.TrimRight(line, " "))
	}
}

// shortNames is as many names as find room in width, and how many more.
func shortNames(names []string, width int) string {
	for n := len(names); n > 0; n-- {
		s := strings.Join(names[:n], ", ")
		if n < len(names) {
			s += fmt.Sprintf(" +%d", len(names)-n)
		}
		if utf8.RuneCountInString(s) <= width {
			return s
		}
	}
	if len(names) == 0 {
		return ""
	}
	return fmt.Sprintf("(%d)", len(names))
}

// markOf is the two letters that stand for a flag in the list; a flag without a
// mark is written out.
func markOf(flag string) string {
	switch flag {
	case "high alert":
		return "HA"
	case "controlled":
		return "CD"
	case "protect from light":
		return "PL"
	case "filter needle":
		return "FN"
	case "in-line filter":
		return "IF"
	case "large vein":
		return "LV"
	case "central line preferred":
		return "CL"
	case "paralysing":
		return "PA"
	case "emulsion":
		return "EM"
	case "no preservative for neuraxial":
		return "NP"
	case "vesicant":
		return "VE"
	case "separate line":
		return "SL"
	case "shake or invert":
		return "SH"
	case "keep refrigerated":
		return "KR"
	}
	return flag
}
