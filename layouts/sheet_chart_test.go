package layouts

import (
	"testing"

	"drawup/layouts/ink"
)

// A dose beside the line of a chart keeps clear of it, wherever the start
// lies: a figure that is struck through could be misread.
func TestChartFiguresKeepClearOfTheLine(t *testing.T) {
	const wide = ink.Micrometre(18000)
	h := regular(2300).narrow()
	placed := 0
	for at := 100; at <= 10000; at += 50 {
		for _, start := range []bool{true, false} {
			p := plot{x: 1500, y: 19000, w: 41000, h: 15000, hand: h}
			b, ok := p.beside(p.at(at), wide, h.lead(), start)
			if !ok {
				continue
			}
			placed++
			under := b.y-p.lineAt(b.x) >= 800
			over := p.lineAt(b.right())-b.bottom() >= 250
			if !under && !over {
				t.Errorf("point at %d, start %v: got a figure from %d,%d to %d,%d, want it clear of the line", at, start, b.x, b.y, b.right(), b.bottom())
			}
			if b.bottom() > p.y || b.x < p.x {
				t.Errorf("point at %d, start %v: got a figure beyond the axes", at, start)
			}
		}
	}
	if placed < 100 {
		t.Errorf("got %d figures beside the line, want at least 100 to look at", placed)
	}
}

// lineAt is how high the line stands above x.
func (p plot) lineAt(x ink.Micrometre) ink.Micrometre { return p.y - (x-p.x)*p.h/p.w }
