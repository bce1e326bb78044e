package layouts

import (
	"slices"

	"drawup/labels"
	"drawup/labels/sheets"
	"drawup/layouts/ink"
)

// A hand is how a line of a sheet is set. Figures of the names in act are set
// in strong, everything else in face.
type hand struct {
	face, strong ink.Face
	size         ink.Micrometre
	act          []string
}

func regular(size ink.Micrometre) hand { return hand{face: ink.Regular, strong: ink.Bold, size: size} }
func bold(size ink.Micrometre) hand    { return hand{face: ink.Bold, strong: ink.Bold, size: size} }

// narrow is the same hand in the condensed faces.
func (h hand) narrow() hand {
	h.strong = ink.CondensedSemiBold
	if h.face == ink.Regular {
		h.face = ink.CondensedRegular
		return h
	}
	h.face = ink.CondensedSemiBold
	return h
}

// lead is the height of one row, base how far down its baseline lies: the
// faces reach 1.025 em up and 0.275 em down.
func (h hand) lead() ink.Micrometre { return h.size * 134 / 100 }
func (h hand) base() ink.Micrometre { return h.size * 104 / 100 }

func (h hand) faceFor(c labels.Cell) ink.Face {
	if c.Figure != "" && slices.Contains(h.act, c.Figure) {
		return h.strong
	}
	return h.face
}

// runs are the stretches of a line that are set in one face.
func (h hand) runs(l labels.Line) (texts []string, faces []ink.Face) {
	for _, c := range l {
		if c.Text == "" {
			continue
		}
		f := h.faceFor(c)
		if n := len(faces); n > 0 && faces[n-1] == f {
			texts[n-1] += c.Text
			continue
		}
		texts, faces = append(texts, c.Text), append(faces, f)
	}
	return texts, faces
}

func (h hand) width(l labels.Line) ink.Micrometre {
	var w ink.Micrometre
	texts, faces := h.runs(l)
	for i, t := range texts {
		w += Width(labels.Words(t), faces[i], h.size)
	}
	return w
}

// marks sets a line with the top left corner of its row at x, y.
func (h hand) marks(x, y ink.Micrometre, l labels.Line) []ink.Mark {
	var out []ink.Mark
	texts, faces := h.runs(l)
	for i, t := range texts {
		out = append(out, ink.Text{X: x, Y: y + h.base(), Size: h.size, Face: faces[i], Colour: ink.Black, String: t})
		x += Width(labels.Words(t), faces[i], h.size)
	}
	return out
}

// wrap breaks a line into rows no wider than width, as [Wrap] does: at blanks
// of plain words only.
func (h hand) wrap(l labels.Line, width ink.Micrometre) ([]labels.Line, bool) {
	var rows []labels.Line
	var row labels.Line
	for _, p := range pieces(glued(l)) {
		longer := append(append(labels.Line{}, row...), p...)
		if len(row) > 0 && h.width(trimmed(longer)) > width {
			rows, longer = append(rows, trimmed(row)), p
		}
		if h.width(trimmed(longer)) > width {
			return nil, false
		}
		row = longer
	}
	if row = trimmed(row); len(row) > 0 {
		rows = append(rows, row)
	}
	return rows, true
}

// glued keeps a number and its unit in words on one row (rule N26). Sentences
// with figures are words here: they break at their blanks.
func glued(l labels.Line) labels.Line {
	out := append(labels.Line{}, l...)
	for i := range out {
		if sheets.IsSentence(out[i]) {
			out[i].Figure = ""
		}
		if out[i].Figure == "" {
			out[i].Text = labels.Unbroken(out[i].Text)
		}
	}
	return out
}
