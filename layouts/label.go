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
	for _, row := range a.strips {
		marks = append(marks, a.fromRight(row, a.stripSize(), letters)...)
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
	marks = append(marks, a.row(a.foot, ink.Black)...)
	marks = append(marks, a.fromRight(a.right, a.size, ink.Black)...)
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
	x, right := d.panel.x+300, d.panel.right()-300
	behind := func(left, base, capital ink.Micrometre) box {
		top, low := base-capital-220, base+capital*drop/100+80
		return box{left, top, right - left, low - top}
	}
	var marks []ink.Mark
	top := a.foot.base - a.capital
	for _, row := range a.rows {
		if len(row.items) > 0 {
			top = min(top, row.base-a.capital)
		}
	}
	for _, s := range a.stated {
		if n := len(s.bin.items); n > 0 {
			left := s.bin.right - 300
			for _, it := range s.bin.items {
				left -= it.width(a.size) + a.gap
			}
			marks = append(marks, behind(left+a.gap, s.bin.base, a.capital).filled(ink.White))
		}
	}
	marks = append(marks, box{x, top - 180, right - x, d.panel.bottom() - 250 - top + 180}.filled(ink.White))
	if !d.class.Bar {
		for _, row := range a.strips {
			if len(row.items) > 0 {
				marks = append(marks, behind(row.right-row.used-300, row.base, smallLow).filled(ink.White))
			}
		}
	}
	return marks
}

// stripSize is the em size of the small type along the top edge.
func (a arrangement) stripSize() ink.Micrometre { return newBlock(a.design, 0, smallLow).size }

// row draws the items of a row from its left end.
func (a arrangement) row(r bin, c ink.Colour) []ink.Mark {
	var marks []ink.Mark
	x := r.left
	for _, it := range r.items {
		marks = append(marks, it.marks(x, r.base, a.size, c)...)
		x += it.width(a.size) + a.gap
	}
	return marks
}

// fromRight draws the items of a row against its right end.
func (a arrangement) fromRight(r bin, size ink.Micrometre, c ink.Colour) []ink.Mark {
	x := r.right
	gap := a.gap
	if size != a.size {
		gap = smallLow * 3 / 4
	}
	for i, it := range r.items {
		x -= it.width(size)
		if i > 0 {
			x -= gap
		}
	}
	var marks []ink.Mark
	for _, it := range r.items {
		marks = append(marks, it.marks(x, r.base, size, c)...)
		x += it.width(size) + gap
	}
	return marks
}

// statedMarks draws one concentration, what follows it, and what stands
// beside it, against the right end.
func (a arrangement) statedMarks(s stated) []ink.Mark {
	size := SizeFor(s.face, a.large)
	line := labels.Line{s.cell}
	marks := []ink.Mark{Set(s.bin.left, s.bin.base, line, s.face, size, ink.Black)}
	if s.tail != "" {
		x := s.bin.left + Width(line, s.face, size) + a.gap
		marks = append(marks, Set(x, s.bin.base, labels.Words(s.tail), ink.CondensedSemiBold, a.size, ink.Black))
	}
	return append(marks, a.fromRight(s.bin, a.size, ink.Black)...)
}
