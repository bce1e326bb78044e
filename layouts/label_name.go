package layouts

import (
	"strings"

	"drawup/labels"
	"drawup/layouts/ink"
)

// nameLow is the least height of capitals of the drug name (ISO 26825:2020,
// 5.4.2: at least 2.5 mm; measured on the capital).
const nameLow = 2500

// nameSteps are the heights of capitals that a drug name may have, the
// greatest first, a fifth to a quarter apart: 5.4.2 asks for letters as large
// as possible, and names of like length look alike. Our choice but for the last.
func nameSteps() []ink.Micrometre { return []ink.Micrometre{7000, 5600, 4200, 3400, 2800, nameLow} }

// Reach of letters above and below the baseline in hundredths of the capital
// height, for the bold face and a little to spare: l, d and b above, g, p and
// y below.
const (
	rise = 114
	drop = 32
)

// nameAir parts the name from the concentration.
const nameAir = 250

// A named is the drug name as it was fitted.
type named struct {
	rows    []nameRow
	face    ink.Face
	size    ink.Micrometre
	capital ink.Micrometre
	bottom  ink.Micrometre // where the ink of the last row ends
}

// A nameRow is one row of the name with its place.
type nameRow struct {
	text       string
	left, base ink.Micrometre
}

// nameRows are the ways to break the name, the best first: one row, then two.
// A mixture breaks before "with", a name of two words between them.
func nameRows(l labels.Label) [][]string {
	if l.Second != "" {
		with := "with " + l.Second
		return [][]string{{l.Name + " " + with}, {l.Name, with}}
	}
	ways := [][]string{{l.Name}}
	if i := strings.LastIndex(l.Name, " "); i > 0 {
		ways = append(ways, []string{l.Name[:i], l.Name[i+1:]})
	}
	return ways
}

// fitName sets the name at the greatest step that fits between top and the
// middle of the label: on one row before two, in Bold before Condensed
// SemiBold. It is false when 2.5 mm do not fit; the name is never cut and
// never smaller.
func (d design) fitName(l labels.Label, top ink.Micrometre) (named, bool) {
	for _, rows := range nameRows(l) {
		bold, condensed := spansOf(rows, ink.Bold), spansOf(rows, ink.CondensedSemiBold)
		for _, capital := range nameSteps() {
			if n, ok := d.tryName(rows, bold, ink.Bold, capital, top); ok {
				return n, true
			}
			if n, ok := d.tryName(rows, condensed, ink.CondensedSemiBold, capital, top); ok {
				return n, true
			}
		}
	}
	return named{}, false
}

func spansOf(rows []string, f ink.Face) []span {
	out := make([]span, len(rows))
	for i, row := range rows {
		out[i] = spanOf(row, f)
	}
	return out
}

// nameEnd is where the ink of the name must end.
func (d design) nameEnd() ink.Micrometre {
	if d.class.Line {
		return d.middle - d.lineHeight() - 2*lineAir
	}
	return d.middle - nameAir
}

// nameBase is the baseline of every name on one row, whatever its size: that
// of the greatest step that the height allows, in the middle of its room.
func (d design) nameBase(top ink.Micrometre) ink.Micrometre {
	room := d.nameEnd() - top
	for _, step := range nameSteps() {
		if need := step * (rise + drop) / 100; need <= room {
			return top + (room-need)/2 + step*rise/100
		}
	}
	return d.nameEnd() - nameLow*drop/100
}

// tryName sets the name at one size. At the least size descenders may hang
// into the lower half, as long as the baseline stays in the upper one.
func (d design) tryName(rows []string, spans []span, face ink.Face, capital, top ink.Micrometre) (named, bool) {
	left, right, _ := d.nameArea()
	n := named{face: face, size: SizeFor(face, capital), capital: capital}
	y, widest := top, ink.Micrometre(0)
	if len(rows) == 1 && capital > nameLow && capital*(rise+drop)/100 > d.nameEnd()-top {
		return named{}, false // whatever its letters: names of like length look alike
	}
	for i, row := range rows {
		width := spans[i].at(n.size)
		if width > right-left {
			return named{}, false
		}
		up, down := reachOf(row, face)
		above, below := up.at(n.size), down.at(n.size)
		if i > 0 {
			y += 150
		}
		n.rows = append(n.rows, nameRow{row, left, y + above})
		if d.class.Stripes {
			n.rows[i].left += (right - left - width) / 2
		}
		y += above + below
		widest = max(widest, n.rows[i].left-left+width)
	}
	last := &n.rows[len(n.rows)-1]
	spare := d.nameEnd() - y
	switch {
	case spare < 0 && (capital > nameLow || last.base > d.middle):
		return named{}, false
	case spare >= 0 && len(rows) == 1:
		// A letter that reaches further than most moves the baseline.
		down := min(max(d.nameBase(top)-last.base, 0), spare)
		last.base, y = last.base+down, y+down
	case spare >= 0:
		for i := range n.rows {
			n.rows[i].base += spare / 2
		}
		y += spare / 2
	}
	n.bottom = y
	ink := box{left, top, widest, y - top}
	if d.symbol.w > 0 && ink.meets(d.symbol.grown(100)) {
		return named{}, false
	}
	return n, true
}

// marks draws the name.
func (n named) marks(c ink.Colour) []ink.Mark {
	var out []ink.Mark
	for _, row := range n.rows {
		out = append(out, ink.Text{X: row.left, Y: row.base, Size: n.size, Face: n.face, Colour: c, String: row.text})
	}
	return out
}
