package layouts

import (
	"drawup/labels"
	"drawup/labels/sheets"
	"drawup/layouts/ink"
)

// A plot is the field of a chart: x, y is the corner at nought.
type plot struct {
	x, y, w, h ink.Micrometre
	hand       hand
	taken      []box // where figures stand already
}

// chart draws dose rate upwards against pump rate: a thin line from nought,
// thick within the range, with the start in a diamond and dashed lines to both
// axes. Figures of the dose stand beside the line, where the field is empty.
func (s setter) chart(b sheets.Chart) []slab {
	const high, above, below = 15000, 4000, 6300
	h := regular(2300).narrow()
	p := plot{x: 1500, y: above + high, w: s.width - 1500 - 6000, h: high, hand: h}
	out := slab{h: above + high + below}
	out.marks = append(out.marks, h.marks(0, 0, labels.Words(b.YWord))...)
	end := labels.Words(b.XWord)
	out.marks = append(out.marks, h.marks(s.width-h.width(end), p.y+3300, end)...)
	out.marks = append(out.marks, p.axes()...)
	out.marks = append(out.marks, p.line(0, 10000, 200), p.line(b.Low, b.High, 900))
	for _, point := range b.Points {
		out.marks = append(out.marks, p.point(point)...)
	}
	return []slab{out}
}

// at is the place of a share of the way along the line.
func (p plot) at(share int) ink.Point {
	return ink.Point{X: p.x + p.w*ink.Micrometre(share)/10000, Y: p.y - p.h*ink.Micrometre(share)/10000}
}

func (p plot) axes() []ink.Mark {
	return []ink.Mark{
		ink.Line{X1: p.x, Y1: p.y - p.h - 1000, X2: p.x, Y2: p.y, Width: 300, Colour: ink.Black},
		ink.Line{X1: p.x, Y1: p.y, X2: p.x + p.w + 1000, Y2: p.y, Width: 300, Colour: ink.Black},
	}
}

func (p plot) line(from, to int, width ink.Micrometre) ink.Mark {
	a, b := p.at(from), p.at(to)
	return ink.Line{X1: a.X, Y1: a.Y, X2: b.X, Y2: b.Y, Width: width, Colour: ink.Black}
}

// point marks a point at the axis of the pump rate and beside the line, each
// unless its figure would stand over one that is there already.
func (p *plot) point(point sheets.Point) []ink.Mark {
	at := p.at(point.At)
	h := p.hand
	var out []ink.Mark
	if point.Start {
		h.face = ink.CondensedSemiBold
		out = append(out,
			ink.Line{X1: p.x, Y1: at.Y, X2: at.X, Y2: at.Y, Width: 200, Colour: ink.Black, Dash: true},
			ink.Line{X1: at.X, Y1: at.Y, X2: at.X, Y2: p.y, Width: 200, Colour: ink.Black, Dash: true},
			diamond(at, 1300))
	}
	rate := box{at.X - h.width(point.Rate)/2, p.y + 600, h.width(point.Rate), h.lead()}
	if p.free(rate) {
		p.taken = append(p.taken, rate.grown(800))
		out = append(out, h.marks(rate.x, rate.y, point.Rate)...)
		out = append(out, ink.Line{X1: at.X, Y1: p.y, X2: at.X, Y2: p.y + 700, Width: 200, Colour: ink.Black})
	}
	if dose, ok := p.beside(at, h.width(point.Dose), h.lead(), point.Start); ok {
		p.taken = append(p.taken, dose.grown(500))
		out = append(out, h.marks(dose.x, dose.y, point.Dose)...)
		out = append(out, ink.Line{X1: p.x, Y1: at.Y, X2: p.x + 900, Y2: at.Y, Width: 200, Colour: ink.Black})
	}
	if point.Start { // the dashed lines are no place for figures
		p.taken = append(p.taken, box{p.x, at.Y - 300, at.X - p.x, 600})
	}
	return out
}

// beside is room for a figure at the height of a point: left of the line; for
// the start right of it and below the line, else above its dashed line. The
// line is flat, so that a figure keeps clear of it along its whole height.
func (p plot) beside(at ink.Point, w, h ink.Micrometre, start bool) (box, bool) {
	const clear, near, far = 2600, 900, 6500 // far: a figure there would seem to belong to another point
	left := box{p.x + 1400, at.Y - h/2, w, h}
	if start {
		y := min(at.Y-clear*p.h/p.w+near, p.y-h-300)
		right := box{max(at.X+clear, p.across(y-near)), y, w, h}
		if right.x <= at.X+far && right.right() <= p.x+p.w+5000 && p.free(right) {
			return right, true
		}
		left.y = at.Y - h - 200
	}
	if left.right()+near <= p.across(left.bottom()) && p.free(left) {
		return left, true
	}
	return box{}, false
}

// across is where the line stands at a height.
func (p plot) across(y ink.Micrometre) ink.Micrometre { return p.x + (p.y-y)*p.w/p.h }

func (p plot) free(b box) bool {
	for _, t := range p.taken {
		if t.meets(b) {
			return false
		}
	}
	return true
}

func diamond(at ink.Point, r ink.Micrometre) ink.Mark {
	return ink.Polygon{Fill: ink.Black, Points: []ink.Point{{X: at.X - r, Y: at.Y}, {X: at.X, Y: at.Y - r}, {X: at.X + r, Y: at.Y}, {X: at.X, Y: at.Y + r}}}
}
