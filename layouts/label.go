package layouts

import (
	"drawup/labels"
	"drawup/layouts/ink"
)

// draw gives the marks of an arranged label: layout after ISO 26825:2020, 5.2
// to 5.4. Type in the lower half is black and so is the name, except in a
// black bar.
func (a arrangement) draw() []ink.Mark {
	d := a.design
	marks := d.background()
	letters := ink.Black
	if d.class.Bar {
		letters = colour(d.class.LetterOnBar)
	}
	marks = append(marks, a.whitePanels()...)
	for _, row := range a.upper {
		marks = append(marks, a.row(row, letters)...)
	}
	marks = append(marks, a.name.marks(letters)...)
	if d.class.Line {
		marks = append(marks, a.line.filled(ink.Black))
	}
	for _, s := range a.stated {
		marks = append(marks, a.statedMarks(s)...)
	}
	for _, row := range a.rows {
		marks = append(marks, a.row(row, ink.Black)...)
	}
	marks = append(marks, a.footMarks()...)
	if len(a.modules) > 0 {
		marks = append(marks, d.symbol.filled(ink.White),
			ink.Symbol{X: d.symbol.x + a.module, Y: d.symbol.y + a.module, Module: a.module, Rows: a.modules, Colour: ink.Black})
	}
	return marks
}

// whitePanels lie behind small type on a class colour on which it would be
// hard to read; see labels.Class.Dim.
func (a arrangement) whitePanels() []ink.Mark {
	d := a.design
	if !d.class.Dim() || d.mono {
		return nil
	}
	var marks []ink.Mark
	capital := ink.Micrometre(faceOf(ink.CondensedRegular).CapHeight(int64(a.size)))
	top := a.foot.base - capital
	for _, row := range a.rows {
		if len(row.items) > 0 {
			top = min(top, row.base-capital)
		}
	}
	right := d.panel.right() - 300
	x := d.panel.x + 300
	marks = append(marks, box{x, top - 200, right - x, d.panel.bottom() - 250 - top + 200}.filled(ink.White))
	if len(a.upper) > 0 && !d.class.Bar {
		y, low := a.upper[0].base-capital-280, a.upper[len(a.upper)-1].base+capital*31/100+80
		marks = append(marks, box{x, y, d.panel.w - 600, low - y}.filled(ink.White))
	}
	return marks
}

// row draws the items of a row from its left end.
func (a arrangement) row(r bin, c ink.Colour) []ink.Mark {
	var marks []ink.Mark
	x := r.left
	for _, it := range r.items {
		marks = append(marks, it.marks(x, r.base, a.size, c)...)
		x += it.width(a.size) + a.gap()
	}
	return marks
}

func (a arrangement) gap() ink.Micrometre {
	return ink.Micrometre(faceOf(ink.CondensedRegular).CapHeight(int64(a.size))) * 5 / 4
}

// statedMarks draws one concentration, what follows it, and what stands
// beside it.
func (a arrangement) statedMarks(s stated) []ink.Mark {
	size := SizeFor(s.face, a.large)
	line := labels.Line{s.cell}
	marks := []ink.Mark{Set(s.bin.left, s.bin.base, line, s.face, size, ink.Black)}
	if s.tail != "" {
		x := s.bin.left + Width(line, s.face, size) + a.gap()*3/5
		marks = append(marks, Set(x, s.bin.base, labels.Words(s.tail), ink.CondensedSemiBold, a.size, ink.Black))
	}
	// What stands beside it is set against the right end.
	x := s.bin.right
	for i := len(s.bin.items) - 1; i >= 0; i-- {
		it := s.bin.items[i]
		x -= it.width(a.size)
		marks = append(marks, it.marks(x, s.bin.base, a.size, ink.Black)...)
		x -= a.gap()
	}
	return marks
}

// footMarks draws the class word along the bottom edge, the serial against
// the right end.
func (a arrangement) footMarks() []ink.Mark {
	row := a.foot.copied()
	var marks []ink.Mark
	if n := len(row.items); n > 1 {
		last := row.items[n-1]
		row.items = row.items[:n-1]
		marks = last.marks(row.right-last.width(a.size), row.base, a.size, ink.Black)
	}
	return append(a.row(row, ink.Black), marks...)
}
