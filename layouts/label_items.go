package layouts

import (
	"strings"

	"drawup/labels"
	"drawup/layouts/ink"
)

// smallLow is the least height of capitals of everything but name and
// concentration. No standard gives one; 1.2 mm is some 4.9 points, near the
// least that packs and newspapers set, and what a 600 and a 300 dots per inch
// printer still draws with strokes of two dots. Common practice, no source.
const smallLow = 1200

// concentrationLow is the least height of capitals of the concentration: our
// choice, between the name's 2.5 mm and the small type.
const concentrationLow = 2000

// An item is one line of small type.
type item struct {
	line labels.Line
	face ink.Face
	// blank is the length of a line to write on, after the text; tail follows
	// it.
	blank ink.Micrometre
	tail  string
	// beside allows the item to stand on the row of the concentration, and
	// foot on that of the class word.
	beside, foot bool
	// whole keeps plain words of a cell together, such as a person's name.
	whole bool
	// start begins a row where rows are filled in order.
	start bool
}

func plain(l labels.Line) item { return item{line: l, face: ink.CondensedRegular, foot: true} }

// digest says what it is: digits beside an amount could be read as part of it.
func digest(l labels.Label) item {
	if l.Digest == "" {
		return item{}
	}
	return plain(labels.Words("ref " + l.Digest))
}

// prepared is broken, if at all, before the name of who prepared.
func prepared(l labels.Label) item {
	it := plain(l.Prepared)
	it.whole = true
	return it
}

func strong(text string) item {
	return item{line: labels.Words(text), face: ink.CondensedSemiBold}
}

// Room to write by hand: the length for a name and for a pump rate, and the
// height of the row.
const (
	writeName   = 15000
	writeRate   = 9000
	writeHeight = 3000
)

// lowerItems lists the small type of the lower half in reading order. From
// level 1 on the marks stand in the upper half, from level 2 on also what
// tells of the preparation, on level 3 the digest.
func lowerItems(l labels.Label, level int) []item {
	var items []item
	for _, line := range []labels.Line{l.Amount, l.Substance, l.Dose} {
		it := plain(line)
		it.beside = true
		items = append(items, it)
	}
	items = append(items, plain(l.Diluent))
	if l.Route != "" {
		items = append(items, strong(l.Route))
	}
	items = append(items, item{line: l.UseBy, face: ink.CondensedSemiBold, start: true})
	if level < 2 {
		items = append(items, prepared(l))
	}
	if level < 3 {
		items = append(items, digest(l))
	}
	items = append(items, handwritten(l)...)
	if level < 1 {
		for _, m := range l.Marks {
			items = append(items, strong(m))
		}
	}
	return filled(items)
}

// handwritten lists patient, check and pump rate: printed where known, else
// left to be written.
func handwritten(l labels.Label) []item {
	var items []item
	switch {
	case l.Patient != "":
		items = append(items, plain(labels.Words("patient "+l.Patient)))
	case l.Infusion:
		items = append(items, item{line: labels.Words("patient"), face: ink.CondensedRegular, blank: 2 * writeName})
	}
	if l.CheckedBy || l.Infusion {
		items = append(items, item{line: labels.Words("checked by"), face: ink.CondensedRegular, blank: writeName})
	}
	if l.Infusion {
		items = append(items, item{line: labels.Words("pump rate"), face: ink.CondensedRegular, blank: writeRate, tail: "mL/h"})
	}
	return items
}

// upperItems lists the small type of the upper half.
func upperItems(l labels.Label, level int) []item {
	var items []item
	if level >= 1 {
		for _, m := range l.Marks {
			items = append(items, strong(m))
		}
	}
	if level >= 2 {
		items = append(items, prepared(l))
	}
	if level >= 3 {
		items = append(items, digest(l))
	}
	return filled(items)
}

func filled(items []item) []item {
	var out []item
	for _, it := range items {
		if it.line.Text() != "" {
			out = append(out, it)
		}
	}
	return out
}

// split wraps an item to rows of the given width, each an item of its own.
func (it item) split(size, width ink.Micrometre) ([]item, bool) {
	if it.width(size) <= width {
		return []item{it}, true
	}
	if it.blank > 0 {
		return nil, false
	}
	rows, ok := Wrap(it.line, it.face, size, width)
	if it.whole {
		rows, ok = it.cells(size, width)
	}
	var out []item
	for _, row := range rows {
		part := it
		part.line = row
		out = append(out, part)
	}
	return out, ok
}

// cells breaks the line before plain cells that begin with a blank.
func (it item) cells(size, width ink.Micrometre) ([]labels.Line, bool) {
	var rows []labels.Line
	for _, c := range it.line {
		if len(rows) == 0 || c.Figure == "" && strings.HasPrefix(c.Text, " ") {
			rows = append(rows, nil)
		}
		rows[len(rows)-1] = append(rows[len(rows)-1], c)
	}
	for i, row := range rows {
		rows[i] = trimmed(row)
		if Width(rows[i], it.face, size) > width {
			return nil, false
		}
	}
	return rows, true
}

// width is the item's length at an em size, with its line to write on.
func (it item) width(size ink.Micrometre) ink.Micrometre {
	w := Width(it.line, it.face, size)
	if it.blank > 0 {
		w += it.blank + size
		if it.tail != "" {
			w += Width(labels.Words(it.tail), it.face, size)
		}
	}
	return w
}

// marks draws the item with its baseline at x, y.
func (it item) marks(x, y, size ink.Micrometre, c ink.Colour) []ink.Mark {
	out := []ink.Mark{Set(x, y, it.line, it.face, size, c)}
	if it.blank > 0 {
		x += Width(it.line, it.face, size) + size/2
		out = append(out, ink.Rule(x, y+150, it.blank, 120))
		if it.tail != "" {
			out = append(out, Set(x+it.blank+size/2, y, labels.Words(it.tail), it.face, size, c))
		}
	}
	return out
}
