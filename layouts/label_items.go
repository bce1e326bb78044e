package layouts

import (
	"slices"
	"strings"

	"drawup/labels"
	"drawup/layouts/ink"
)

// smallLow is the least height of capitals of everything but name and
// concentration. No standard gives one; 1.2 mm is some 4.9 points, near the
// least that packs and newspapers set, and what a 600 and a 300 dots per inch
// printer still draws with strokes of two dots. Common practice, no source.
const smallLow = 1200

// concentrationLow is the least height of capitals of the concentration, and
// concentrationLast that of labels which would be refused else: our choice,
// between the name's 2.5 mm and the small type.
const (
	concentrationLow  = 2000
	concentrationLast = 1800
)

// An item is one line of small type.
type item struct {
	line labels.Line
	face ink.Face
	span span // of the line
	// blank is the length of a line to write on, after the text; tail follows
	// it.
	blank ink.Micrometre
	tail  string
	after span // of the tail
	// beside allows the item to stand on the row of the concentration.
	beside bool
	// whole keeps plain words of a cell together, such as a person's name.
	whole bool
	// start begins a row, except where rows are packed densely.
	start bool
	// late items may stand wherever there is room, once the others have their
	// rows.
	late bool
	// serial marks the serial number: labels that differ in nothing else are
	// arranged once.
	serial bool
}

func newItem(l labels.Line, f ink.Face) item {
	it := item{line: l, face: f}
	for _, c := range l {
		it.span += spanOf(c.Text, f)
	}
	return it
}

func plain(l labels.Line) item { return newItem(l, ink.CondensedRegular) }

func strong(text string) item { return newItem(labels.Words(text), ink.CondensedSemiBold) }

func (it item) starting() item {
	it.start = true
	return it
}

// digest says what it is: digits beside an amount could be read as part of it.
func digest(l labels.Label) item {
	if l.Digest == "" {
		return item{}
	}
	it := plain(labels.Words("ref " + l.Digest))
	it.late = true
	return it
}

// prepared is broken, if at all, before the name of who prepared.
func prepared(l labels.Label) item {
	it := plain(l.Prepared).starting()
	it.whole = true
	return it
}

// Room to write by hand: the length for a name and for a pump rate, and the
// height of the row.
const (
	writeName   = 15000
	writeRate   = 9000
	writeHeight = 3000
)

// A content is the small type of a label, sorted by where it stands.
type content struct {
	strip  []item // along the top edge
	rows   []item // lower half, in reading order
	word   item   // class word
	foot   []item // what may stand on its row, before the serial; from the right
	serial item
	stated []stated // concentrations
}

// A place is where the words about the making of the label stand, which say
// nothing about what is in the syringe.
type place int

const (
	below    place = iota + 1 // in the last rows
	atEdge                    // along the top edge, but for who made it and when
	allAbove                  // all along the top edge
)

// contentOf sorts the small type.
func contentOf(l labels.Label, where place) content {
	c := content{word: strong(l.Class.Word), serial: plain(labels.Line{l.Serial}), stated: statedOf(l)}
	c.serial.serial = true
	for _, line := range []labels.Line{labels.Words(l.Bracketed()), l.Amount, l.Substance} {
		it := plain(line)
		it.beside = true
		c.rows = append(c.rows, it)
	}
	c.rows = append(c.rows, plain(l.Diluent))
	if l.Route != "" {
		c.rows = append(c.rows, strong(l.Route))
	}
	dose := plain(l.Dose)
	dose.late = true
	c.rows = append(c.rows, newItem(l.UseBy, ink.CondensedSemiBold).starting(), dose)
	made, marks, ref := prepared(l), markItems(l), filled([]item{digest(l)})
	switch where {
	case below:
		c.rows = append(c.rows, made)
		c.rows = append(c.rows, handwritten(l)...)
		slices.Reverse(marks)
		c.foot = append(ref, marks...)
	case atEdge:
		c.rows = append(c.rows, made)
		c.rows = append(c.rows, handwritten(l)...)
		c.strip = append(marks, ref...)
	case allAbove:
		c.rows = append(c.rows, handwritten(l)...)
		c.strip = filled(append(append(marks, ref...), made))
	}
	c.rows = filled(c.rows)
	return c
}

// markItems is one item a mark; the first begins a row.
func markItems(l labels.Label) []item {
	var out []item
	for i, m := range l.Marks {
		it := plain(labels.Words(m))
		it.start, it.late = i == 0, true
		out = append(out, it)
	}
	return out
}

// handwritten lists patient, check and pump rate: printed where known, else
// left to be written.
func handwritten(l labels.Label) []item {
	var items []item
	switch {
	case l.Patient != "":
		items = append(items, plain(labels.Words("patient "+l.Patient)))
	case l.Infusion:
		it := plain(labels.Words("patient"))
		it.blank = 2 * writeName
		items = append(items, it)
	}
	if l.CheckedBy || l.Infusion {
		it := plain(labels.Words("checked by"))
		it.blank = writeName
		items = append(items, it)
	}
	if l.Infusion {
		it := plain(labels.Words("pump rate"))
		it.blank, it.tail, it.after = writeRate, "mL/h", spanOf("mL/h", it.face)
		items = append(items, it)
	}
	return items
}

func filled(items []item) []item {
	var out []item
	for _, it := range items {
		if it.span > 0 {
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
		part.line, part.span = row, spanOf(row.Text(), it.face)
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
	w := it.span.at(size)
	if it.blank > 0 {
		w += it.blank + size
		if it.tail != "" {
			w += it.after.at(size)
		}
	}
	return w
}

// draw sets the item with its baseline at x, y.
func (it item) draw(to *drawing, x, y, size ink.Micrometre, c ink.Colour) {
	if it.serial {
		to.serial = len(to.marks)
	}
	to.add(Set(x, y, it.line, it.face, size, c))
	if it.blank > 0 {
		x += it.span.at(size) + size/2
		to.add(ink.Rule(x, y+150, it.blank, 120))
		if it.tail != "" {
			to.add(Set(x+it.blank+size/2, y, labels.Words(it.tail), it.face, size, c))
		}
	}
}
