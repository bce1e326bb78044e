package layouts

import (
	"drawup/labels"
	"drawup/labels/sheets"
	"drawup/layouts/ink"
)

// columns are where the columns of a table start and how wide they are.
func columns(list []sheets.Column, from, width ink.Micrometre) (starts, widths []ink.Micrometre) {
	sum := ink.Micrometre(0)
	for _, c := range list {
		sum += ink.Micrometre(c.Share)
	}
	x := from
	for _, c := range list {
		w := (width - from) * ink.Micrometre(c.Share) / max(sum, 1)
		starts, widths = append(starts, x), append(widths, w)
		x += w
	}
	return starts, widths
}

// tableHead is the row of heads with a line below.
func (s setter) tableHead(list []sheets.Column, from ink.Micrometre) slab {
	starts, widths := columns(list, from, s.width)
	var out slab
	for i, c := range list {
		cell := s.lines(labels.Words(c.Head), bold(s.f.small-100), starts[i], widths[i]-1200)
		out.marks = append(out.marks, cell.marks...)
		out.h = max(out.h, cell.h)
	}
	out.h += 900
	out.marks = append(out.marks, ink.Rule(0, out.h-500, s.width, 300))
	out.keep = true
	return out
}

// table is one slab a row under a head, which is printed again where a row
// opens a page.
func (s setter) table(b sheets.Table) []slab {
	from := ink.Micrometre(0)
	if b.Box {
		from = tick + 2200
	}
	starts, widths := columns(b.Columns, from, s.width)
	head := s.tableHead(b.Columns, from)
	out := []slab{head}
	size, gap := s.f.table, s.f.row
	if b.Small {
		size, gap = s.f.small-100, 400
	}
	for _, r := range b.Rows {
		row := slab{head: &head}
		for i, cell := range r.Cells[:min(len(r.Cells), len(b.Columns))] {
			h := regular(size)
			if b.Columns[i].Strong || r.Strong && (i > 0 || !b.Box) {
				h = bold(size)
			}
			c := s.lines(cell, h, starts[i], widths[i]-1200)
			row.marks = append(row.marks, c.marks...)
			row.h = max(row.h, c.h)
		}
		if b.Box {
			row.h = max(row.h, tick+600)
			row.marks = append(row.marks, ink.Outlined(200, 350, tick, tick, 250, ink.Black))
		}
		row.h += gap
		row.marks = append(row.marks, ink.Rule(0, row.h-gap/2, s.width, 80))
		out = append(out, row)
	}
	return out
}

// blank is a grid with heads and rows to write in.
func (s setter) blank(b sheets.Blank) []slab {
	high := s.f.write
	starts, widths := columns(b.Columns, 0, s.width)
	out := s.tableHead(b.Columns, 0)
	out.marks = out.marks[:len(out.marks)-1]
	for range b.Rows {
		for i := range starts {
			out.marks = append(out.marks, ink.Outlined(starts[i], out.h, widths[i], high, 200, ink.Black))
		}
		out.h += high
	}
	out.h += 300
	out.keep = false
	return []slab{out}
}

// boxes are empty boxes with a word before and a unit behind, two a row.
func (s setter) boxes(b sheets.Boxes) []slab {
	const gutter, high = 5000, 7000
	half := (s.width - gutter) / 2
	var out []slab
	for i := 0; i < len(b.List); {
		row := slab{h: high + 1300}
		row.marks = append(row.marks, s.box(b.List[i], 0, half, high)...)
		i++
		if i < len(b.List) {
			row.marks = append(row.marks, s.box(b.List[i], half+gutter, half, high)...)
			i++
		}
		out = append(out, row)
	}
	return out
}

// box is one of them.
func (s setter) box(b sheets.Box, x, width, high ink.Micrometre) []ink.Mark {
	label, unit := regular(s.f.small+100), regular(s.f.small)
	wide := width * 40 / 100
	text := s.lines(labels.Words(b.Label), label, x, wide-1000)
	out := text.at(0, max(0, (high-text.h)/2))
	room := max(ink.MM(21), unit.width(labels.Words(b.Unit))+1500)
	out = append(out, ink.Outlined(x+wide, 0, width-wide-room, high, 250, ink.Black))
	u := s.lines(labels.Words(b.Unit), unit, x+width-room+1000, room-1000)
	return append(out, u.at(0, max(0, (high-u.h)/2))...)
}

// ticks are sentences with a box to tick.
func (s setter) ticks(b sheets.Ticks) []slab {
	const indent = tick + 2200
	var out []slab
	for _, t := range b.List {
		row := s.lines(labels.Words(t), regular(s.f.small+200), indent, s.width-indent)
		row.marks = append(row.marks, ink.Outlined(0, 350, tick, tick, 250, ink.Black))
		row.h = max(row.h, tick) + 900
		out = append(out, row)
	}
	return out
}

// sign is a line for each person with the word below.
func (s setter) sign(b sheets.Sign) []slab {
	gutter, above := ink.Micrometre(5000), s.f.write
	n := ink.Micrometre(max(len(b.Roles), 1))
	each := (s.width - gutter*(n-1)) / n
	out := slab{}
	for i, r := range b.Roles {
		x := ink.Micrometre(i) * (each + gutter)
		word := s.lines(labels.Words(r), regular(max(2200, s.f.small-200)), x, each)
		out.marks = append(out.marks, ink.Rule(x, above, each, 250))
		out.marks = append(out.marks, word.at(0, above+300)...)
		out.h = max(out.h, above+300+word.h)
	}
	return []slab{out}
}

// big is one slab a row: word, number, note. The one number of the sheet
// stands in a thick frame.
func (s setter) big(b sheets.Big) []slab {
	var out []slab
	for _, r := range b.List {
		out = append(out, s.bigRow(r))
	}
	return out
}

func (s setter) bigRow(r sheets.BigRow) slab {
	size, pad := ink.Micrometre(4300), ink.Micrometre(200)
	if r.Most {
		size, pad = 8400, 400
	}
	wide := s.width * 22 / 100
	value := bold(size)
	valueWide := s.width * 48 / 100
	number := s.lines(r.Value, value, wide, valueWide)
	key := s.lines(labels.Words(r.Key), regular(s.f.body), 2000, wide-2500)
	note := s.lines(r.Note, regular(s.f.small), wide+valueWide+1500, s.width-wide-valueWide-3000)
	if r.Most {
		note = s.lines(r.Note, regular(s.f.body), wide+valueWide+1500, s.width-wide-valueWide-3000)
	}
	h := max(number.h, key.h, note.h) + 2*pad
	out := slab{h: h}
	for _, part := range []slab{number, key, note} {
		out.marks = append(out.marks, part.at(0, (h-part.h)/2)...)
	}
	if r.Most {
		out.marks = append(out.marks, ink.Outlined(400, 0, s.width-800, h, 800, ink.Black))
		return slab{h: h + 1200, marks: out.at(0, 900)}
	}
	out.marks = append(out.marks, ink.Rule(0, h, s.width, 80))
	return out
}
