package sheets

import (
	"fmt"

	"drawup/dilution/formulary"
	"drawup/labels"
)

// A sourceList numbers the sources that a sheet names, so that a sentence
// carries a number and the end of the sheet spells it out.
type sourceList struct {
	seen map[string]int
	list []formulary.Source
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

// notes are the cautions that the formulary holds for the drug, each with the
// mark of its source.
func (l *sourceList) notes(s scribe) []Caution {
	var out []Caution
	add := func(n formulary.Note) {
		out = append(out, Caution{Text: sentence(n.Text), Note: l.mark(n.Source, n.Unverified)})
	}
	for _, n := range s.p.Presentation.Notes {
		add(n)
	}
	for _, n := range s.p.Drug.Cautions {
		add(n)
	}
	for _, n := range []*formulary.Note{s.p.Drug.NeverAsInfusion, s.p.Drug.NeverAsBolus} {
		if n != nil {
			add(*n)
		}
	}
	return out
}

// part is the list of sources at the end of a sheet.
func (l *sourceList) part(syringe int) Part {
	if len(l.list) == 0 {
		return Part{}
	}
	var left, right Pairs
	left.Small, right.Small = true, true
	for i, s := range l.list {
		pair := words(fmt.Sprintf("source %d", i+1), s.Title+" ("+grade(s.Grade)+")")
		if i < (len(l.list)+1)/2 {
			left.List = append(left.List, pair)
		} else {
			right.List = append(right.List, pair)
		}
	}
	return Part{Syringe: syringe, Blocks: []Block{
		heading("Sources"),
		Beside{LeftShare: 50, Left: []Block{left}, Right: []Block{right}},
		Words{Line: labels.Words(grades), Small: true},
	}}
}

// grades says what the formulary's letters mean.
const grades = "Grade A: label, guideline, standard or paper. B: handbook or hospital guide. C: weak. P: common practice, no source."

func grade(g string) string {
	if g == "" {
		return "grade not known"
	}
	return "grade " + g
}
