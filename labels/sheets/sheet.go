// Package sheets holds what the sheets say: the draw-up sheet, the pump card
// and the two pages of the check sheet. It knows no page, no font and no
// place on paper.
//
// A sheet is parts, a part is blocks, a block is lines of cells. Every figure
// stands in a cell of its own with its name, taken from labels.Facts, so that
// the second route can be shown all of them.
package sheets

import (
	"fmt"
	"strings"

	"drawup/dilution"
	"drawup/dilution/recheck"
	"drawup/labels"
)

// A Size is a size of paper.
type Size string

// Sizes of paper, both upright.
const (
	A4 Size = "A4"
	A5 Size = "A5"
)

// Names of papers, as the second route and messages call them.
const (
	PaperDrawUp = "draw-up sheet"
	PaperPump   = "pump card"
	PaperCheck  = "check sheet"
)

// A Sheet is one paper. It may run over several pages.
type Sheet struct {
	Paper    string
	Size     Size
	Title    string // printed at the head of each of its pages
	Note     string // printed beside the title, "open only after …"
	Of       string // printed instead of it on pages that continue, "7 Noradrenaline"
	Bookmark string // in the outline of the file
	Syringe  int    // number in making order; 0 for several
	OnePage  bool   // refused where it does not fit on one page
	Parts    []Part
	Foot     Foot
}

// A Part is a run of blocks that belong to one syringe and are kept on one
// page where they fit. Syringe 0 belongs to no single one.
type Part struct {
	Syringe int
	Blocks  []Block
}

// A Foot is what every page carries at its foot.
type Foot struct {
	Made, Preparer, Place      string
	Formulary, FormularyDigest string
	State                      string // approval line of the formulary
	Digest                     string // of order, formulary and time
	Invented                   bool
	LeftOut                    string // which syringes were left out, where the sheet itself does not say
}

// Advice stands on every page.
const Advice = "Local policy, the pack in the hand and licensed staff decide."

// footOf takes the foot from what all papers of a run share.
func footOf(m labels.Making) Foot {
	return Foot{Made: m.Made, Preparer: m.Preparer, Place: m.Place, Formulary: m.Formulary,
		FormularyDigest: m.FormularyDigest, State: m.State, Digest: m.Digest, Invented: m.Invented}
}

// footSaying is the foot of a sheet that points to the draw-up sheet for what
// was left out.
func footSaying(list dilution.List, m labels.Making) Foot {
	foot := footOf(m)
	var numbers []string
	for _, l := range list.LeftOut {
		numbers = append(numbers, fmt.Sprint(l.Number))
	}
	switch len(numbers) {
	case 0:
	case 1:
		foot.LeftOut = "Left out: syringe " + numbers[0] + ", see draw-up sheet."
	default:
		foot.LeftOut = "Left out: syringes " + strings.Join(numbers, ", ") + ", see draw-up sheet."
	}
	return foot
}

// leftOutNames is "syringe 4 (ephedrine), syringe 7 (propofol)", "" for none.
func leftOutNames(list dilution.List) string {
	var out []string
	for _, l := range list.LeftOut {
		out = append(out, fmt.Sprintf("syringe %d (%s)", l.Number, l.Drug))
	}
	return strings.Join(out, ", ")
}

// Syringes lists the syringes of which the sheet prints figures, in the order
// in which they first stand on it.
func (s Sheet) Syringes() []int {
	var out []int
	seen := map[int]bool{}
	s.walk(func(n int, _ labels.Cell) {
		if !seen[n] {
			seen[n] = true
			out = append(out, n)
		}
	})
	return out
}

// FiguresOf is every figure of syringe n that the sheet prints, as the second
// route wants it; names repeat between syringes, not within one.
func (s Sheet) FiguresOf(n int) []recheck.Figure {
	var out []recheck.Figure
	s.walk(func(of int, c labels.Cell) {
		if of == n {
			out = append(out, recheck.Figure{Paper: s.Paper, Name: c.Figure, Text: c.Text})
		}
	})
	return out
}

// walk visits every figure with the syringe that it belongs to.
func (s Sheet) walk(visit func(syringe int, c labels.Cell)) {
	for _, p := range s.Parts {
		for _, b := range p.Blocks {
			for _, o := range b.Lines() {
				n := o.Syringe
				if n == 0 {
					n = p.Syringe
				}
				for _, c := range o.Line {
					if c.Figure != "" {
						visit(n, c)
					}
				}
			}
		}
	}
}

// Text is every line of the sheet in reading order, empty ones left out.
func (s Sheet) Text() []string {
	out := []string{s.Title, s.Note, s.Of}
	for _, p := range s.Parts {
		for _, b := range p.Blocks {
			for _, o := range b.Lines() {
				out = append(out, o.Line.Text())
			}
		}
	}
	var full []string
	for _, t := range out {
		if t != "" {
			full = append(full, t)
		}
	}
	return full
}
