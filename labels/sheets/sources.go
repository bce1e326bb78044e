package sheets

import (
	"fmt"
	"strings"

	"drawup/dilution/formulary"
	"drawup/labels"
)

// A sourceList numbers the sources that a sheet names, so that a sentence
// carries a number and the end of the sheet spells it out.
type sourceList struct {
	seen    map[string]int
	list    []formulary.Source
	records []string // drugs whose record is the site's own, and drugs whose is not
}

// mark is what stands behind a sentence: "source 3", "source 3, unverified".
func (l *sourceList) mark(s formulary.Source, unverified bool) string {
	text := "no source"
	if s.Title != "" {
		n, ok := l.seen[s.Title]
		if !ok {
			if l.seen == nil {
				l.seen = map[string]int{}
			}
			l.list = append(l.list, s)
			n = len(l.list)
			l.seen[s.Title] = n
		}
		text = fmt.Sprintf("source %d", n)
	}
	if unverified {
		text += ", unverified"
	}
	return text
}

// record notes where the record of the drug comes from, in a list that was
// planned from a site's own formulary.
func (l *sourceList) record(s scribe, f *formulary.Formulary) {
	if f == nil || f.Base == "" {
		return
	}
	text := s.drug() + ": " + s.p.Drug.From
	for _, have := range l.records {
		if have == text {
			return
		}
	}
	l.records = append(l.records, text)
}

// short are the formulary's words on this very container, and those on what
// the drug is never used for, each with the mark of its source.
func (l *sourceList) short(s scribe) []Caution {
	out := l.cautions(s, s.p.Presentation.Notes)
	for _, n := range []*formulary.Note{s.p.Drug.NeverAsInfusion, s.p.Drug.NeverAsBolus} {
		if n != nil {
			out = append(out, l.cautions(s, []formulary.Note{*n})...)
		}
	}
	return out
}

// cautions are notes of the formulary on the drug of s.
func (l *sourceList) cautions(s scribe, notes []formulary.Note) []Caution {
	var out []Caution
	for _, n := range notes {
		out = append(out, Caution{Text: s.note(n.Text), Note: labels.Words(l.mark(n.Source, n.Unverified))})
	}
	return out
}

// part is the list of sources at the end of a sheet.
func (l *sourceList) part(syringe int) Part {
	if len(l.list)+len(l.records) == 0 {
		return Part{}
	}
	const group = 12 // sources that stand beside each other, half of them on each side
	blocks := []Block{heading("Sources")}
	if len(l.records) > 0 {
		blocks = append(blocks, Words{Line: labels.Words("Records of " + strings.Join(l.records, "; ") + "."), Small: true})
	}
	for from := 0; from < len(l.list); from += group {
		to := min(from+group, len(l.list))
		half := from + (to-from+1)/2
		blocks = append(blocks, Beside{LeftShare: 50, Left: []Block{l.pairs(from, half)}, Right: []Block{l.pairs(half, to)}})
	}
	return Part{Syringe: syringe, Blocks: append(blocks, Words{Line: labels.Words(grades), Small: true})}
}

// pairs are the sources from one place in the list up to another.
func (l *sourceList) pairs(from, to int) Pairs {
	out := Pairs{Small: true}
	for i := from; i < to; i++ {
		s := l.list[i]
		out.List = append(out.List, words(fmt.Sprintf("source %d", i+1), s.Title+" ("+grade(s.Grade)+")"))
	}
	return out
}

// grades says what the formulary's letters mean.
const grades = "Grade A: label, guideline, standard or paper. B: handbook or hospital guide. C: weak. P: common practice, no source."

func grade(g string) string {
	if g == "" {
		return "grade not known"
	}
	return "grade " + g
}
