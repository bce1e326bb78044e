package layouts

import (
	"strings"

	"drawup/fonts"
	"drawup/labels"
	"drawup/layouts/ink"
)

// faceOf is the measured face behind a face of ink.
func faceOf(f ink.Face) *fonts.Face { return fonts.Get(fonts.Name(f)) }

// Width is how far a line reaches at an em size, rounded up.
func Width(l labels.Line, f ink.Face, size ink.Micrometre) ink.Micrometre {
	var sum span
	for _, c := range l {
		sum += spanOf(c.Text, f)
	}
	return sum.at(size)
}

// SizeFor is the smallest em size whose capitals are at least capital high.
func SizeFor(f ink.Face, capital ink.Micrometre) ink.Micrometre {
	return ink.Micrometre(faceOf(f).SizeForCapHeight(int64(capital)))
}

// Largest is the greatest height of capitals from low to high, in steps of
// 50 micrometres, at which the line is no wider than width. It is false when
// not even low fits.
func Largest(l labels.Line, f ink.Face, width, low, high ink.Micrometre) (ink.Micrometre, bool) {
	for capital := high; capital >= low; capital -= 50 {
		if Width(l, f, SizeFor(f, capital)) <= width {
			return capital, true
		}
	}
	if Width(l, f, SizeFor(f, low)) <= width {
		return low, true
	}
	return 0, false
}

// Set is the mark for a line with the left end of its baseline at x, y.
func Set(x, y ink.Micrometre, l labels.Line, f ink.Face, size ink.Micrometre, c ink.Colour) ink.Text {
	return ink.Text{X: x, Y: y, Size: size, Face: f, Colour: c, String: l.Text()}
}

// Missing is every rune of text that the face cannot show.
func Missing(text string, f ink.Face) []rune { return faceOf(f).Missing(text) }

// Wrap breaks a line into rows no wider than width. It breaks only at blanks
// in plain words, never inside a figure, never between a number and its unit in
// words (rule N26) and never between a figure and what stands next to it
// without a blank. It is false when a piece that may not be
// broken is wider than width.
func Wrap(l labels.Line, f ink.Face, size, width ink.Micrometre) ([]labels.Line, bool) {
	var rows []labels.Line
	var row labels.Line
	for _, p := range pieces(l) {
		longer := append(append(labels.Line{}, row...), p...)
		if len(row) > 0 && Width(trimmed(longer), f, size) > width {
			rows = append(rows, trimmed(row))
			row = nil
			longer = p
		}
		if Width(trimmed(longer), f, size) > width {
			return nil, false
		}
		row = longer
	}
	if row = trimmed(row); len(row) > 0 {
		rows = append(rows, row)
	}
	return rows, true
}

// pieces are the parts between which a line may be broken; each keeps the
// blank that follows it.
func pieces(l labels.Line) []labels.Line {
	var out []labels.Line
	var now labels.Line
	for _, c := range l {
		if c.Figure != "" {
			now = append(now, c)
			continue
		}
		for _, word := range strings.SplitAfter(labels.Unbroken(c.Text), " ") {
			if word == "" {
				continue
			}
			now = append(now, labels.Cell{Text: word})
			if strings.HasSuffix(word, " ") {
				out = append(out, now)
				now = nil
			}
		}
	}
	if len(now) > 0 {
		out = append(out, now)
	}
	return out
}

// trimmed is the line without blanks of plain words at its ends.
func trimmed(l labels.Line) labels.Line {
	out := append(labels.Line{}, l...)
	for len(out) > 0 && out[0].Figure == "" {
		out[0].Text = strings.TrimLeft(out[0].Text, " ")
		if out[0].Text != "" {
			break
		}
		out = out[1:]
	}
	for len(out) > 0 && out[len(out)-1].Figure == "" {
		last := &out[len(out)-1]
		last.Text = strings.TrimRight(last.Text, " ")
		if last.Text != "" {
			break
		}
		out = out[:len(out)-1]
	}
	return out
}
