package sheets

import (
	"regexp"
	"strings"

	"drawup/dilution/quantity/lint"
	"drawup/dilution/recheck"
	"drawup/labels"
)

// perPaper is how many rows of sentences each paper has for itself, so that no
// two sentences of one syringe share a name.
const perPaper = 1000

// A register numbers the sentences and limits of one syringe on one paper that
// hold figures, so that the second route sees each of them.
type register struct {
	from int
	rows map[string]int
}

// newRegister starts the numbers of a paper.
func newRegister(paper string) *register {
	r := &register{rows: map[string]int{}}
	switch paper {
	case PaperPump:
		r.from = perPaper
	case PaperCheck:
		r.from = 2 * perPaper
	}
	return r
}

// row is the number of a text; the same text keeps its number.
func (r *register) row(table, text string) int {
	key := table + " " + text
	if _, ok := r.rows[key]; !ok {
		r.rows[key] = r.from + len(r.rows) + 1
	}
	return r.rows[key]
}

// said is a sentence: a figure of its own when it holds a digit, else words.
func (s scribe) said(text string) labels.Line { return s.listed(recheck.Said, text) }

// bound is a limit of the formulary as printed.
func (s scribe) bound(text string) labels.Line { return s.listed(recheck.Bound, text) }

func (s scribe) listed(table, text string) labels.Line {
	text = s.house().Grouped(text)
	if !holdsDigit(text) {
		return labels.Words(text)
	}
	return labels.Line{{Text: text, Figure: recheck.Row(table, s.rows.row(table, text), "text")}}
}

// house is the site's house style as the linter knows it.
func (s scribe) house() lint.House {
	if h, ok := lint.Named(s.p.Style.String()); ok {
		return h
	}
	return lint.UK()
}

// typed is a quantity of the order: as it was typed, but spelled and grouped as
// the house does it, so that a paper never shows the µg or cc that a keyboard
// may (rule R14).
func (s scribe) typed(text string) string {
	fixed, _ := s.house().Fixed(text)
	return s.house().Grouped(fixed)
}

// note is a sentence of the formulary. One with figures is printed word for
// word but for the sign between thousands, since the second route looks it up
// so.
func (s scribe) note(text string) labels.Line {
	if !holdsDigit(text) {
		return labels.Words(sentence(text))
	}
	text = strings.TrimSpace(text)
	if stopped(text) {
		return s.said(text)
	}
	return joined(s.said(text), labels.Words("."))
}

// numbered finds the numbers of syringes in a sentence.
var numbered = regexp.MustCompile(`syringes? [0-9]+((, | and | to )[0-9]+)*`)

// saidOfAll is a sentence that names syringes by their numbers: these are
// words, what stands between them is said of this syringe.
func (s scribe) saidOfAll(text string) labels.Line {
	var out labels.Line
	at := 0
	for _, span := range numbered.FindAllStringIndex(text, -1) {
		out = joined(out, s.said(text[at:span[0]]), labels.Words(text[span[0]:span[1]]))
		at = span[1]
	}
	return joined(out, s.said(text[at:]))
}

func holdsDigit(text string) bool { return strings.ContainsAny(text, "0123456789") }

// IsSentence reports that a cell is a sentence or a limit in words: it is
// broken at its blanks like any other sentence, unlike a figure.
func IsSentence(c labels.Cell) bool {
	return strings.HasPrefix(c.Figure, recheck.Said+".") || strings.HasPrefix(c.Figure, recheck.Bound+".")
}
