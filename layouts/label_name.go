package layouts

import (
	"strings"

	"drawup/labels"
	"drawup/layouts/ink"
)

// nameLow is the least height of capitals of the drug name (ISO 26825:2020,
// 5.4.2: at least 2.5 mm; measured on the capital), nameHigh our greatest.
const (
	nameLow  = 2500
	nameHigh = 7000
)

// A named is the drug name as it was fitted.
type named struct {
	rows    []labels.Line
	face    ink.Face
	size    ink.Micrometre
	capital ink.Micrometre
	left    ink.Micrometre
	bases   []ink.Micrometre // baseline of each row
	bottom  ink.Micrometre   // where the ink of the last row ends
}

// nameRows are the ways to break the name, the best first: one row, then two.
// A mixture breaks before "with", a name of two words between them.
func nameRows(l labels.Label) [][]labels.Line {
	if l.Second != "" {
		with := "with " + l.Second
		return [][]labels.Line{{labels.Words(l.Name + " " + with)}, {labels.Words(l.Name), labels.Words(with)}}
	}
	ways := [][]labels.Line{{labels.Words(l.Name)}}
	if i := strings.LastIndex(l.Name, " "); i > 0 {
		ways = append(ways, []labels.Line{labels.Words(l.Name[:i]), labels.Words(l.Name[i+1:])})
	}
	return ways
}

// fitName sets the name as large as it fits between top and the middle of the
// label, less what is reserved there for small type: in Bold, else in Condensed SemiBold, else on two rows. It is false
// when 2.5 mm do not fit; the name is never cut and never smaller.
func (d design) fitName(l labels.Label, top, reserve ink.Micrometre) (named, bool) {
	for _, rows := range nameRows(l) {
		for _, face := range []ink.Face{ink.Bold, ink.CondensedSemiBold} {
			for capital := ink.Micrometre(nameHigh); capital >= nameLow; capital -= 50 {
				if n, ok := d.tryName(rows, face, capital, top, reserve); ok {
					return n, true
				}
			}
		}
	}
	return named{}, false
}

// A fitted remembers the last name that was fitted: most steps of the search
// for the right size of type leave it where it is.
type fitted struct {
	top, reserve ink.Micrometre
	name         named
	ok, known    bool
}

func (f *fitted) fit(d design, l labels.Label, top, reserve ink.Micrometre) (named, bool) {
	if !f.known || f.top != top || f.reserve != reserve {
		name, ok := d.fitName(l, top, reserve)
		*f = fitted{top: top, reserve: reserve, name: name, ok: ok, known: true}
	}
	return f.name, f.ok
}

// tryName sets the name at one size. At the least size descenders may hang
// into the lower half, as long as the baseline stays in the upper one.
func (d design) tryName(rows []labels.Line, face ink.Face, capital, top, reserve ink.Micrometre) (named, bool) {
	left, right, _ := d.nameArea()
	n := named{rows: rows, face: face, size: SizeFor(face, capital), capital: capital, left: left}
	y, widest := top, ink.Micrometre(0)
	for i, row := range rows {
		above, below := faceOf(face).Extents(row.Text(), int64(n.size))
		if i > 0 {
			y += 150
		}
		n.bases = append(n.bases, y+ink.Micrometre(above))
		y += ink.Micrometre(above + below)
		widest = max(widest, Width(row, face, n.size))
	}
	if widest > right-left {
		return named{}, false
	}
	spare := d.middle - reserve - y
	if d.class.Line {
		spare -= d.lineHeight() + 100
	}
	if capital > nameLow {
		spare -= legGap // air before the concentration
	}
	switch {
	case spare > 0 && !d.class.Stripes:
		for i := range n.bases {
			n.bases[i] += spare / 2
		}
		y += spare / 2
	case spare < 0 && (capital > nameLow || reserve > 0 || n.bases[len(n.bases)-1] > d.middle):
		return named{}, false
	}
	n.bottom = y
	ink := box{left, top, widest, y - top}
	if d.symbol.w > 0 && ink.meets(d.symbol.grown(300)) {
		return named{}, false
	}
	return n, true
}

// marks draws the name.
func (n named) marks(c ink.Colour) []ink.Mark {
	var out []ink.Mark
	for i, row := range n.rows {
		out = append(out, Set(n.left, n.bases[i], row, n.face, n.size, c))
	}
	return out
}
