package layouts

import (
	"fmt"

	"drawup/labels"
	"drawup/labels/sheets"
	"drawup/layouts/ink"
)

// name is the head of a syringe: number in black, a small band of the class
// colour, the drug large and at the right, as large, the concentration or what
// to draw; the class word and the rest below. The colour says nothing that the
// word does not say (R16).
func (s setter) name(b sheets.Name) []slab {
	size := ink.Micrometre(5600)
	if b.Large {
		size = 7000
	}
	h := bold(size)
	square := h.lead() + 1400
	left := square + 6000
	out := slab{keep: true}
	out.marks = append(out.marks, ink.Rule(0, 0, s.width, 600))
	y := ink.Micrometre(1100)
	number := labels.Words(fmt.Sprint(b.Number))
	digits := bold(size)
	for digits.width(number) > square-1000 && digits.size > 2500 {
		digits.size -= 100
	}
	out.marks = append(out.marks, ink.Filled(0, y, square, square, ink.Black))
	out.marks = append(out.marks, whitened(digits.marks((square-digits.width(number))/2, y+(square-digits.lead())/2, number))...)
	out.marks = append(out.marks, classBand(b.Class, square+1200, y, 3200, square)...)
	drug, large := labels.Words(b.Drug), b.Concentration
	if len(b.Act) > 0 {
		large = b.Act
	}
	top := y - 200
	nameHand := h
	rows := s.rows(drug, &nameHand, s.width-left)
	wide := nameHand.width(rows0(rows))
	text := y
	for _, r := range rows {
		out.marks = append(out.marks, nameHand.marks(left, top, r)...)
		top += nameHand.lead()
	}
	if len(large) > 0 {
		w := h.width(large)
		if len(rows) == 1 && left+wide+4000+w <= s.width {
			out.marks = append(out.marks, h.marks(s.width-w, text-200, large)...)
		} else {
			c := s.lines(large, h, left, s.width-left)
			out.marks = append(out.marks, c.at(0, top)...)
			top += c.h
		}
	}
	if len(b.Act) > 0 {
		second := s.second(b, left)
		out.marks = append(out.marks, second.at(0, top)...)
		top += second.h
	}
	word := bold(s.f.small).narrow()
	x := left
	if b.Class.Word != "" {
		out.marks = append(out.marks, word.marks(left, top, labels.Words(b.Class.Word))...)
		x += word.width(labels.Words(b.Class.Word)) + 3000
	}
	below := s.lines(b.Below, regular(s.f.small+200), x, s.width-x)
	out.marks = append(out.marks, below.at(0, top-200)...)
	out.h = max(y+square, top+max(below.h, word.lead())) + 700
	return []slab{out}
}

// second is the row below the drug and what to draw: the concentration at the
// left, what becomes of the drawn volume at the right, or below each other
// where they are too wide.
func (s setter) second(b sheets.Name, left ink.Micrometre) slab {
	h := bold(s.f.body + 300)
	w := h.width(b.Then)
	if left+h.width(b.Concentration)+4000+w <= s.width {
		out := slab{h: h.lead() + 400}
		out.marks = append(h.marks(left, 0, b.Concentration), h.marks(s.width-w, 0, b.Then)...)
		return out
	}
	return stacked([]slab{s.lines(b.Concentration, h, left, s.width-left), s.lines(b.Then, h, left, s.width-left)})
}

func rows0(rows []labels.Line) labels.Line {
	if len(rows) == 0 {
		return nil
	}
	return rows[0]
}

// whitened turns text white, for a black ground.
func whitened(marks []ink.Mark) []ink.Mark {
	for i, m := range marks {
		if t, ok := m.(ink.Text); ok {
			t.Colour = ink.White
			marks[i] = t
		}
	}
	return marks
}

// classBand is a small sample of the label's design. Without a class there is
// none.
func classBand(c labels.Class, x, y, w, h ink.Micrometre) []ink.Mark {
	if c.Code == "" {
		return nil
	}
	fill := colour(c.Fill)
	out := []ink.Mark{ink.Filled(x, y, w, h, fill)}
	if c.Stripes {
		out = []ink.Mark{ink.Filled(x, y, w, h, ink.White)}
		out = append(out, stripes(box{x, y, w, h}, box{x, y, w, h}, fill)...)
	}
	if c.Bar {
		out = append(out, ink.Filled(x, y, w, h/2, ink.Black))
	}
	return append(out, ink.Outlined(x, y, w, h, 200, ink.Black))
}
