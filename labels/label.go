// Package labels holds what a syringe label says: drug, figures, times, and
// the class that decides its colour and design. It knows no page and no
// millimetre of paper.
package labels

import (
	"strings"

	"drawup/dilution/quantity/lint"
	"drawup/dilution/recheck"
)

// A Cell is a piece of a line. Figure is a name from package recheck for a
// figure, empty for plain words. The text of a figure is never broken, cut or
// changed by anything that places it.
type Cell struct {
	Text   string
	Figure string
}

// A Line is a run of cells set one after the other; blanks between them are
// part of the cells.
type Line []Cell

// Text is the line as it reads.
func (l Line) Text() string {
	var s strings.Builder
	for _, c := range l {
		s.WriteString(c.Text)
	}
	return s.String()
}

// Words is a line of plain words without a figure; nil for an empty text.
func Words(text string) Line {
	if text == "" {
		return nil
	}
	return Line{{Text: text}}
}

// Unbroken is a text of words in which a no-break blank ties each number to its
// unit, so that no line ends between them (rule N26).
func Unbroken(text string) string { return lint.Glue(text) }

// Marks that a label carries when what stands behind it is not approved. They
// are short because a label is small.
const (
	MarkStarter    = "unapproved data"
	MarkUnverified = "unverified figures"
)

// A Label is what one syringe label says.
//
// Name, Concentration and UseBy must be there, and Class must be one of
// Classes. Every Line says its own words ("use by …", "made …"): nothing is
// put in front of it later. Where Infusion is set, Diluent, Route, Amount and
// Prepared must be there as well, and Patient, check and pump rate are left to
// be written by hand where they are empty.
type Label struct {
	Number int // of the syringe in making order, from 1
	Class  Class

	Name                string // as printed: "Etomidate", or a mixed-case form as it stands, "ePHEDrine"
	Other               string // the drug's name elsewhere, printed small and in brackets; optional
	Second              string // second drug of a mixture, printed below after "with"
	As                  string // what the amount refers to, "base"; printed after the concentration
	Concentration       Cell   // "2 mg/mL"
	SecondConcentration Cell   // of Second

	Amount    Line // "20 mg in 10 mL"
	Substance Line // "8 mmol in 10 mL"; optional
	UseBy     Line // "use by 01 Dec 2026 19:30"
	Prepared  Line // "made 01 Dec 2026 07:30 A. Example"
	Dose      Line // "dose 7.2 mL = 14.4 mg"; optional

	Route   string // printed when not empty, "infiltration only"
	Patient string // optional, "HM-01"; printed after the word patient
	Serial  Cell   // eight digits
	Codes   []Cell // what the barcode may hold, in human-readable form, the fullest first; empty for a label without

	Infusion  bool // adds the pump rate, left to be written
	Diluent   Line // "diluent glucose 5 %"
	CheckedBy bool // leaves a line for the second person's name

	Marks  []string // MarkStarter, MarkUnverified, …
	Digest string   // of order, formulary and time; printed after "ref" when not empty
}

// Bracketed is the drug's other name as it is printed, "" when there is none.
func (l Label) Bracketed() string {
	if l.Other == "" {
		return ""
	}
	return "(" + l.Other + ")"
}

// lines lists all lines and cells in reading order.
func (l Label) lines() []Line {
	lines := []Line{
		Words(l.Name), Words(l.Bracketed()), Words(l.Second), {l.Concentration}, Words(l.As), {l.SecondConcentration},
		l.Amount, l.Substance, l.Dose, l.Diluent, Words(l.Route), Words(l.Patient), l.UseBy, l.Prepared,
	}
	for _, m := range l.Marks {
		lines = append(lines, Words(m))
	}
	lines = append(lines, Words(l.Class.Word), Line{l.Serial})
	if l.Digest != "" {
		lines = append(lines, Line{{Text: l.Digest, Figure: recheck.Ref}})
	}
	for _, code := range l.Codes {
		lines = append(lines, Line{code})
	}
	return lines
}

// Each calls see with every text of the label, the barcode's forms included.
func (l Label) Each(see func(text string)) {
	for _, text := range []string{l.Name, l.Bracketed(), l.Second, l.Concentration.Text, l.As, l.SecondConcentration.Text, l.Route, l.Patient, l.Class.Word, l.Serial.Text, l.Digest} {
		see(text)
	}
	for _, code := range l.Codes {
		see(code.Text)
	}
	for _, line := range []Line{l.Amount, l.Substance, l.Dose, l.Diluent, l.UseBy, l.Prepared} {
		for _, c := range line {
			see(c.Text)
		}
	}
	for _, m := range l.Marks {
		see(m)
	}
}

// Figures is every figure of the label, as the second route wants it. Paper
// is the name of the paper, "label".
func (l Label) Figures(paper string) []recheck.Figure {
	var out []recheck.Figure
	for _, line := range l.lines() {
		for _, c := range line {
			if c.Figure != "" {
				out = append(out, recheck.Figure{Paper: paper, Name: c.Figure, Text: c.Text})
			}
		}
	}
	return out
}

// Text is every line of the label in reading order, empty ones left out. The
// last are what the barcode may say, the fullest form first; paper holds one of
// them.
func (l Label) Text() []string {
	var out []string
	for _, line := range l.lines() {
		if t := line.Text(); t != "" {
			out = append(out, t)
		}
	}
	return out
}
