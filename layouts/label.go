package layouts

import (
	"drawup/labels"
	"drawup/layouts/ink"
)

// A drawing is the marks of a label at 0, 0, and which of them differ between
// labels that are alike but for serial number and barcode; -1 for none.
type drawing struct {
	marks          []ink.Mark
	serial, symbol int
}

func (to *drawing) add(m ink.Mark) { to.marks = append(to.marks, m) }

// draw gives the marks of an arranged label: layout after ISO 26825:2020, 5.2
// to 5.4. Type in the lower half is black and so is the name, except in a
// black bar.
func (a arrangement) draw() drawing {
	d := a.design
	to := &drawing{marks: d.background(), serial: -1, symbol: -1}
	letters := ink.Black
	if d.class.Bar {
		letters = colour(d.class.LetterOnBar)
	}
	to.marks = append(to.marks, a.whitePanels()...)
	for _, row := range a.strips {
		a.fromRight(to, row, a.stripSize(), stripGap, letters)
	}
	to.marks = append(to.marks, a.name.marks(letters)...)
	if d.class.Line {
		to.add(a.line.filled(ink.Black))
	}
	for _, s := range a.stated {
		a.drawStated(to, s)
	}
	for _, row := range a.rows {
		a.row(to, row, ink.Black)
	}
	a.row(to, a.foot, ink.Black)
	a.fromRight(to, a.right, a.size, a.gap, ink.Black)
	if a.side > 0 {
		to.add(d.symbol.filled(ink.White))
		to.symbol = len(to.marks)
		to.add(ink.Symbol{X: d.symbol.x + a.module, Y: d.symbol.y + a.module, Module: a.module, Colour: ink.Black}) // its rows differ from label to label
	}
	return *to
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
				marks = append(marks, behind(max(row.right-row.used-300, x), row.base, smallLow).filled(ink.White))
			}
		}
	}
	return marks
}

// stripSize is the em size of the small type along the top edge.
func (a arrangement) stripSize() ink.Micrometre { return newBlock(a.design, 0, smallLow).size }

// row draws the items of a row from its left end.
func (a arrangement) row(to *drawing, r bin, c ink.Colour) {
	x := r.left
	for _, it := range r.items {
		it.draw(to, x, r.base, a.size, c)
		x += it.width(a.size) + a.gap
	}
}

// fromRight draws the items of a row against its right end.
func (a arrangement) fromRight(to *drawing, r bin, size, gap ink.Micrometre, c ink.Colour) {
	x := r.right
	for i, it := range r.items {
		x -= it.width(size)
		if i > 0 {
			x -= gap
		}
	}
	for _, it := range r.items {
		it.draw(to, x, r.base, size, c)
		x += it.width(size) + gap
	}
}

// drawStated draws one concentration, what follows it, and what stands beside
// it, against the right end.
func (a arrangement) drawStated(to *drawing, s stated) {
	face := statedFaces()[s.face]
	size := SizeFor(face, a.large)
	to.add(Set(s.bin.left, s.bin.base, labels.Line{s.cell}, face, size, ink.Black))
	if s.tail != "" {
		x := s.bin.left + s.wide[s.face].at(size) + a.gap
		to.add(Set(x, s.bin.base, labels.Words(s.tail), ink.CondensedSemiBold, a.size, ink.Black))
	}
	a.fromRight(to, s.bin, a.size, a.gap, ink.Black)
}
