package layouts

import (
	"drawup/labels"
	"drawup/layouts/ink"
)

// Measures of the design. Sources: ISO 26825:2020, 5.2.2 and 5.4.4 where a
// clause is given; the others are our choice.
const (
	stripeGap = 530 // 5.4.4: at least 0.5 mm from the stripes to the top of the name; 0.03 mm for the rounding of type sizes
	lineLow   = 350 // least thickness of the reversal line
	lineAir   = 80  // from the name to it
	lineOver  = 40  // it covers the ends of the stripes by so much
	legGap    = 350 // the stripes beside the name end this far above the concentration
	hairline  = 100
)

// A design is the coloured part of a label on its panel.
type design struct {
	panel  box
	edge   ink.Micrometre // type stays this far inside the panel's left and right end
	class  labels.Class
	mono   bool
	middle ink.Micrometre // border of the upper and the lower half
	band   ink.Micrometre // height of the stripes at the top, 0 without
	leg    ink.Micrometre // width of the stripes beside the name
	legEnd ink.Micrometre // where they end
	symbol box            // white panel of the barcode, empty without
}

// newDesign places everything but words. The stripes form an upside-down U:
// at least the upper 20 % of the label's width, and at least 15 % of its
// length on each side of the name (5.4.4). They end with the upper half,
// because 5.4.3 keeps the lower half free for the concentration.
func newDesign(panel box, s Stock, c labels.Class, mono bool, symbol box) design {
	d := design{panel: panel, edge: 900, class: c, mono: mono, middle: panel.y + panel.h/2, symbol: symbol}
	if s.Inset > 0 {
		d.edge = 600 // the panel is clear of the label's edge already
	}
	d.legEnd = d.middle - legGap
	if symbol.w > 0 {
		d.legEnd = min(d.legEnd, symbol.y-300)
	}
	if c.Stripes {
		d.band = (panel.h + 4) / 5
		d.leg = (panel.w*15 + 99) / 100
	}
	return d
}

// nameArea is where the name may stand: its left and right end, and its top.
func (d design) nameArea() (left, right, top ink.Micrometre) {
	if d.class.Stripes {
		return d.panel.x + d.leg + 400, d.panel.right() - d.leg - 400, d.panel.y + d.band + stripeGap
	}
	return d.panel.x + d.edge, d.panel.right() - d.edge, d.panel.y + 600
}

// lineHeight is the thickness of the reversal line, 0 without.
func (d design) lineHeight() ink.Micrometre {
	if !d.class.Line {
		return 0
	}
	return max(lineLow, d.panel.h/43)
}

func colour(c labels.RGB) ink.Colour { return ink.Colour{R: c.R, G: c.G, B: c.B} }

// background draws fill, stripes and bar.
func (d design) background() []ink.Mark {
	p := d.panel
	var marks []ink.Mark
	if !d.mono {
		marks = append(marks, p.filled(colour(d.class.Background())))
	}
	if d.class.Stripes {
		c := colour(d.class.Fill)
		if d.mono {
			c = ink.Black
		}
		// The three parts overlap a little: edges that only touch show as
		// hairlines in some renderers.
		const overlap = 200
		marks = append(marks, stripes(box{p.x, p.y, p.w, d.band}, p, c)...)
		down := d.legEnd - p.y - d.band + overlap
		marks = append(marks, stripes(box{p.x, p.y + d.band - overlap, d.leg, down}, p, c)...)
		marks = append(marks, stripes(box{p.right() - d.leg, p.y + d.band - overlap, d.leg, down}, p, c)...)
	}
	if d.class.Bar {
		marks = append(marks, box{p.x, p.y, p.w, d.middle - p.y}.filled(ink.Black))
	}
	return marks
}

// line is the reversal line under the name whose ink ends at y. It runs the
// length of the label and ends before the barcode where it would meet it.
func (d design) line(y ink.Micrometre) box {
	b := box{d.panel.x, y, d.panel.w, d.lineHeight()}
	if d.symbol.w > 0 && b.meets(d.symbol.grown(300)) {
		b.w = d.symbol.x - 300 - b.x
	}
	return b
}

// stripes fills a part of the panel with stripes 1 mm wide and 1 mm apart,
// both measured at right angles, that rise from lower left to upper right at
// 45 degrees to the long axis (5.2.2). Along such a stripe x + y does not
// change, as y counts downwards; 1 mm across it is the root of two along the
// panel, 1 414 214 nanometres.
func stripes(part, panel box, c ink.Colour) []ink.Mark {
	const across = 1_414_214
	var marks []ink.Mark
	origin := panel.x + panel.y
	first := part.x + part.y - origin
	last := part.right() + part.bottom() - origin
	for k := int64(first) * 1000 / (2 * across); k*2*across <= int64(last)*1000; k++ {
		from := origin + ink.Micrometre(k*2*across/1000)
		to := origin + ink.Micrometre((k*2+1)*across/1000)
		if points := diagonal(part, from, to); len(points) > 2 {
			marks = append(marks, ink.Polygon{Points: points, Fill: c})
		}
	}
	return marks
}

// diagonal is the part of a box in which from <= x+y <= to, in whole
// micrometres: the borders meet the sides of the box in whole numbers.
func diagonal(b box, from, to ink.Micrometre) []ink.Point {
	corners := []ink.Point{{X: b.x, Y: b.y}, {X: b.right(), Y: b.y}, {X: b.right(), Y: b.bottom()}, {X: b.x, Y: b.bottom()}}
	return halfPlane(halfPlane(corners, from, 1), to, -1)
}

// halfPlane keeps the side of x+y = at on which sign*(x+y-at) is not negative.
// Every side of the shape that it cuts runs along the page.
func halfPlane(shape []ink.Point, at ink.Micrometre, sign ink.Micrometre) []ink.Point {
	var out []ink.Point
	for i, a := range shape {
		b := shape[(i+1)%len(shape)]
		da, db := sign*(a.X+a.Y-at), sign*(b.X+b.Y-at)
		if da >= 0 {
			out = append(out, a)
		}
		if da > 0 && db < 0 || da < 0 && db > 0 {
			cut := ink.Point{X: at - a.Y, Y: a.Y}
			if a.X == b.X {
				cut = ink.Point{X: a.X, Y: at - a.X}
			}
			out = append(out, cut)
		}
	}
	return out
}
