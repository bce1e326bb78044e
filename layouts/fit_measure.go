package layouts

import (
	"sync"

	"drawup/fonts"
	"drawup/layouts/ink"
)

// A span is how far a text reaches at an em of 127 mm, that is 36 000
// hundredths of a point: as all widths grow with the em, it gives the width at
// any size without looking at the letters again.
type span int64

// The em of a span, in micrometres and in hundredths of a point.
const (
	spanEm        = 127_000
	spanHundredth = 36_000
)

// at is the length at an em size, rounded up; see fonts.Face.Width.
func (s span) at(size ink.Micrometre) ink.Micrometre {
	if size <= 0 {
		return 0
	}
	return ink.Micrometre((int64(s)*fonts.Hundredths(int64(size)) + spanHundredth - 1) / spanHundredth)
}

// A gauge holds the measures of the first 256 runes of a face. They stand in a
// table because a label is measured letter by letter hundreds of times.
type gauge struct {
	face              *fonts.Face
	advance, up, down [256]span
}

// gauges are built once for the whole program and never change.
var gauges = sync.OnceValue(func() map[ink.Face]*gauge {
	out := map[ink.Face]*gauge{}
	for _, name := range fonts.Names() {
		g := &gauge{face: fonts.Get(name)}
		for r := range rune(len(g.advance)) {
			up, down := g.face.Extents(string(r), spanEm)
			g.advance[r], g.up[r], g.down[r] = span(g.face.Width(string(r), spanEm)), span(up), span(down)
		}
		out[ink.Face(name)] = g
	}
	return out
})

// spanOf measures a text; 0 in a face that there is not.
func spanOf(text string, f ink.Face) span {
	g := gauges()[f]
	if g == nil {
		return 0
	}
	var sum span
	for _, r := range text {
		if int(r) < len(g.advance) {
			sum += g.advance[r]
		} else {
			sum += span(g.face.Width(string(r), spanEm))
		}
	}
	return sum
}

// reachOf is how far a text rises above and drops below its baseline.
func reachOf(text string, f ink.Face) (up, down span) {
	g := gauges()[f]
	if g == nil {
		return 0, 0
	}
	for _, r := range text {
		if int(r) < len(g.advance) {
			up, down = max(up, g.up[r]), max(down, g.down[r])
		} else {
			above, below := g.face.Extents(string(r), spanEm)
			up, down = max(up, span(above)), max(down, span(below))
		}
	}
	return up, down
}
