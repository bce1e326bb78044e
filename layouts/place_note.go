package layouts

import (
	"fmt"
	"strings"

	"drawup/labels"
	"drawup/layouts/ink"
)

// noteSize is the capital height of the words at a sheet's edge.
const noteSize = 1700

// edgeNote is what a sheet says about itself: stock, page, how to print it, a
// ruler that proves the scale, and the caller's words. It stands in the upper
// and lower margin, or on the last label where there is no margin.
func (s Stock) edgeNote(foot []string, claim string, page, total int) []ink.Mark {
	said := []string{
		fmt.Sprintf("%s, sheet %d of %d. Print at 100 %%, without fitting to the page.", s.Name, page, total),
		"Design: " + claim + ".",
	}
	if s.Note != "" {
		said = append(said, "Note: "+s.Note+".")
	}
	if !s.NoMargin {
		marks := noteRows([]string{said[0]}, s.Left, ink.MM(6), s.PageW-2*s.Left)
		marks = append(marks, noteRows([]string{strings.Join(said[1:], " ")}, s.Left, ink.Tenths(90), s.PageW-2*s.Left)...)
		y := s.PageH - s.Top + ink.Tenths(32)
		marks = append(marks, ruler(s.Left, y)...)
		return append(marks, noteRows(foot, s.Left+ink.MM(52), y, s.PageW-2*s.Left-ink.MM(52))...)
	}
	p := s.panel(s.Place(s.Columns*s.Rows - 1))
	said = append(said, foot...)
	return append(noteRows(said, p.x, p.y+noteSize, p.w), ruler(p.x, p.bottom()-ink.MM(1))...)
}

// noteRows sets texts one under the other from the baseline y on, each wrapped
// to the width.
func noteRows(texts []string, x, y, width ink.Micrometre) []ink.Mark {
	size := SizeFor(ink.CondensedRegular, noteSize*8/10)
	var marks []ink.Mark
	for _, text := range texts {
		rows, ok := Wrap(labels.Words(text), ink.CondensedRegular, size, width)
		if !ok {
			rows = []labels.Line{labels.Words(text)}
		}
		for _, row := range rows {
			marks = append(marks, Set(x, y, row, ink.CondensedRegular, size, ink.Black))
			y += ink.Tenths(24)
		}
	}
	return marks
}

// ruler is 40 mm long, with a tick every 10 mm.
func ruler(x, y ink.Micrometre) []ink.Mark {
	marks := []ink.Mark{ink.Rule(x, y, ink.MM(40), 150)}
	for i := range ink.Micrometre(5) {
		marks = append(marks, ink.Line{X1: x + i*ink.MM(10), Y1: y - 1200, X2: x + i*ink.MM(10), Y2: y, Width: 150, Colour: ink.Black})
	}
	return append(marks, Set(x+ink.MM(41), y, labels.Words("40 mm"), ink.CondensedRegular, SizeFor(ink.CondensedRegular, 1360), ink.Black))
}
