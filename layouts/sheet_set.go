package layouts

import (
	"fmt"
	"slices"

	"drawup/dilution/refusal"
	"drawup/labels"
	"drawup/labels/sheets"
	"drawup/layouts/ink"
)

// tick is the side of a box to tick.
const tick = 3200

// A setter turns blocks into slabs of one width.
type setter struct {
	f       format
	width   ink.Micrometre
	room    ink.Micrometre // height of an empty page
	sheet   sheets.Sheet
	syringe int
	refused *refusal.List
}

// tooLong refuses a text that cannot be set without cutting it (R15).
func (s setter) tooLong(got, want string) {
	*s.refused = append(*s.refused, refusal.Reason{Code: refusal.TextTooLong, Severity: refusal.Refuse, Syringe: s.syringe, Field: s.sheet.Paper, Rule: "R15",
		Message: fmt.Sprintf("%q does not fit on the %s.", got, s.sheet.Paper), Got: got, Want: want, Remedy: "shorten it; nothing is cut"})
}

// rows wraps a line, in the condensed face where the plain one is too wide,
// and refuses it where that is too wide as well.
func (s setter) rows(l labels.Line, h *hand, width ink.Micrometre) []labels.Line {
	if rows, ok := h.wrap(l, width); ok {
		return rows
	}
	*h = h.narrow()
	rows, ok := h.wrap(l, width)
	if !ok {
		s.tooLong(l.Text(), "words that break into shorter ones")
	}
	return rows
}

// part is all slabs of a part with the gaps between its blocks.
func (s setter) part(p sheets.Part) []slab {
	var out []slab
	for i, b := range p.Blocks {
		slabs := s.block(b)
		if i > 0 && len(slabs) > 0 && len(out) > 0 {
			out[len(out)-1].h += s.f.gap / 3
		}
		out = append(out, slabs...)
	}
	return out
}

// block is the slabs of one block. A kind that is not known cannot be set and
// is refused.
func (s setter) block(b sheets.Block) []slab {
	switch b := b.(type) {
	case sheets.Heading:
		return s.heading(b)
	case sheets.Name:
		return s.name(b)
	case sheets.Words:
		return s.words(b)
	case sheets.Steps:
		return s.steps(b)
	case sheets.Table:
		return s.table(b)
	case sheets.Blank:
		return s.blank(b)
	case sheets.Pairs:
		return s.pairs(b)
	case sheets.Big:
		return s.big(b)
	case sheets.Boxes:
		return s.boxes(b)
	case sheets.Ticks:
		return s.ticks(b)
	case sheets.Cautions:
		return s.cautions(b)
	case sheets.Sign:
		return s.sign(b)
	case sheets.Chart:
		return s.chart(b)
	case sheets.Beside:
		return s.beside(b)
	}
	s.tooLong(fmt.Sprintf("a block of kind %T", b), "a kind that the layout knows")
	return nil
}

// lines is text in rows from x on, as one slab with its rows below each other.
func (s setter) lines(l labels.Line, h hand, x, width ink.Micrometre) slab {
	var b slab
	for _, row := range s.rows(l, &h, width) {
		b.marks = append(b.marks, h.marks(x, b.h, row)...)
		b.h += h.lead()
	}
	return b
}

func (s setter) heading(b sheets.Heading) []slab {
	h := bold(s.f.body + 600)
	out := s.lines(b.Line, h, 0, s.width)
	out.h += 500
	out.keep = true
	return []slab{out}
}

func (s setter) words(b sheets.Words) []slab {
	h := regular(s.f.body)
	if b.Small {
		h = regular(s.f.small)
	}
	if b.Strong {
		h.face = ink.Bold
	}
	return []slab{s.lines(b.Line, h, 0, s.width)}
}

// steps is one slab an act: box, number, words.
func (s setter) steps(b sheets.Steps) []slab {
	var out []slab
	h := regular(s.f.body)
	h.act = b.Strong
	indent := ink.Micrometre(tick + 2000 + 5500)
	if b.Plain {
		h, indent = regular(s.f.small), 5500
	}
	for i, l := range b.List {
		step := s.lines(l, h, indent, s.width-indent)
		number := fmt.Sprint(i + 1)
		if !b.Plain {
			step.marks = append(step.marks, ink.Outlined(0, 600, tick, tick, 250, ink.Black))
		}
		w := h.width(labels.Words(number))
		step.marks = append(step.marks, h.marks(indent-1800-w, 0, labels.Words(number))...)
		step.h = max(step.h, tick) + 600
		if b.Plain {
			step.h -= 400
		}
		out = append(out, step)
	}
	if len(out) > 1 {
		out[0].keep = true
	}
	return out
}

// pairs is one slab a row: the word, then its value.
func (s setter) pairs(b sheets.Pairs) []slab {
	size := s.f.body
	switch {
	case b.Small:
		size = s.f.small - 200
	case b.Dense:
		size = s.f.table
	}
	key, value := regular(size), regular(size)
	value.act = b.Strong
	var wide ink.Micrometre
	for _, p := range b.List {
		wide = max(wide, key.width(labels.Words(p.Key)))
	}
	wide = min(wide+3000, s.width*2/5)
	var out []slab
	for _, p := range b.List {
		left := s.lines(labels.Words(p.Key), key, 0, wide-1000)
		right := s.lines(p.Value, value, wide, s.width-wide)
		left.marks = append(left.marks, right.marks...)
		left.h = max(left.h, right.h) + 200
		out = append(out, left)
	}
	return out
}

// cautions are sentences with a bar at their left; code and source follow in
// small type, on the last row where there is room.
func (s setter) cautions(b sheets.Cautions) []slab {
	const indent = 3000
	var out []slab
	for _, c := range b.List {
		h, tail := regular(s.f.caution), regular(max(2200, s.f.small-300)).narrow()
		rows := s.rows(c.Text, &h, s.width-indent)
		row := slab{}
		for _, r := range rows {
			row.marks = append(row.marks, h.marks(indent, row.h, r)...)
			row.h += h.lead()
		}
		small := append(labels.Line{}, c.Note...)
		if len(small) > 0 && c.Code != "" {
			small = append(small, labels.Cell{Text: "; "})
		}
		if small = append(small, labels.Words(c.Code)...); len(small) > 0 && len(rows) > 0 {
			x := indent + h.width(rows[len(rows)-1]) + 1500
			if w := tail.width(small); x+w <= s.width {
				row.marks = append(row.marks, tail.marks(x, row.h-h.lead()+h.base()-tail.base(), small)...)
			} else {
				below := s.lines(small, tail, indent, s.width-indent)
				row.marks = append(row.marks, below.at(0, row.h)...)
				row.h += below.h
			}
		}
		row.marks = append(row.marks, ink.Filled(800, 400, 900, row.h-400, ink.Black))
		row.h += s.f.row
		out = append(out, row)
	}
	return out
}

// beside is two columns as one slab, or one below the other where they would
// not fit on a page.
func (s setter) beside(b sheets.Beside) []slab {
	const gutter = 5000
	left, right := s, s
	left.width = (s.width - gutter) * ink.Micrometre(b.LeftShare) / 100
	right.width = s.width - gutter - left.width
	l, r := left.part(sheets.Part{Syringe: s.syringe, Blocks: b.Left}), right.part(sheets.Part{Syringe: s.syringe, Blocks: b.Right})
	out := stacked(l)
	other := stacked(r)
	out.marks = append(out.marks, other.at(left.width+gutter, 0)...)
	if out.h = max(out.h, other.h); out.h > s.room*3/4 {
		return s.part(sheets.Part{Syringe: s.syringe, Blocks: slices.Concat(b.Left, b.Right)})
	}
	return []slab{out}
}

// stacked is slabs below each other as one.
func stacked(list []slab) slab {
	var out slab
	for _, b := range list {
		out.marks = append(out.marks, b.at(0, out.h)...)
		out.h += b.h
	}
	return out
}
