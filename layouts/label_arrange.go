package layouts

import (
	"drawup/labels"
	"drawup/layouts/ink"
)

// An arrangement is a label with everything in its place.
type arrangement struct {
	design  design
	modules []string // rows of the barcode, none without
	module  ink.Micrometre
	name    named
	line    box // reversal line, empty without
	size    ink.Micrometre
	large   ink.Micrometre
	upper   []bin
	stated  []stated
	rows    []bin
	foot    bin
}

// arrange finds the largest type with which the label fits its panel: first
// with the best size of barcode module, then with the smaller ones. When none
// fits it says what did not.
func arrange(l labels.Label, panel box, s Stock, mono bool, modules []string) (arrangement, string) {
	widths := []ink.Micrometre{0}
	if len(modules) > 0 {
		widths = widths[:0]
		for _, dots := range s.Dots {
			widths = append(widths, s.module(dots))
		}
	}
	why := "its barcode"
	for _, module := range widths {
		symbol, ok := symbolBox(panel, s, module, len(modules))
		if !ok {
			continue
		}
		a := arrangement{design: newDesign(panel, l.Class, mono, symbol), modules: modules, module: module}
		if _, ok := a.design.fitName(l, a.nameTop(nil, 0), 0); !ok {
			why = "the drug name in capitals of 2.5 mm"
			continue
		}
		if a.fit(l) {
			return a, ""
		}
		why = "its lines in the smallest type allowed"
	}
	return arrangement{}, why
}

// symbolBox is the white panel of the barcode, quiet zone of one module
// included, in the lower right. On a roll it stays clear of the cut edge. It
// may rise at most 1.5 mm above the middle of the label.
func symbolBox(panel box, s Stock, module ink.Micrometre, count int) (box, bool) {
	if count == 0 {
		return box{}, true
	}
	off := ink.Micrometre(0)
	if s.Inset == 0 {
		off = 300
	}
	side := ink.Micrometre(count+2) * module
	b := box{panel.right() - side - off, panel.bottom() - side - off, side, side}
	return b, b.y >= panel.y+panel.h/2-1500 && b.x > panel.x+panel.w/2
}

// nameTop is where the name may begin: below the small type above it.
func (a *arrangement) nameTop(upper []bin, capital ink.Micrometre) ink.Micrometre {
	_, _, top := a.design.nameArea()
	if len(upper) > 0 && !a.design.class.Stripes {
		return upper[len(upper)-1].base + capital*31/100 + 250
	}
	return top
}

// fit tries sizes of type from large to small, and each with more and more of
// the small type in the upper half.
func (a *arrangement) fit(l labels.Label) bool {
	const steps = 12
	for k := ink.Micrometre(steps); k >= 0; k-- {
		small, large := smallLow+80*k, concentrationLow+250*k
		for level := range 3 {
			if level > 0 && len(upperItems(l, level)) == len(upperItems(l, level-1)) {
				continue
			}
			if a.try(l, level, small, large) {
				a.grow(l, level, small)
				return true
			}
		}
	}
	return false
}

// grow makes the concentration larger as long as all still fits.
func (a *arrangement) grow(l labels.Label, level int, small ink.Micrometre) {
	for {
		larger := *a
		if a.large+100 > 5000 || !larger.try(l, level, small, a.large+100) || larger.large <= a.large {
			return
		}
		*a = larger
	}
}

// try arranges the label with one size of small type. The concentration is
// never larger than the name.
func (a *arrangement) try(l labels.Label, level int, small, large ink.Micrometre) bool {
	d := a.design
	b := block{design: d, capital: small}
	a.size, a.upper, a.line = b.size(), nil, box{}
	items := upperItems(l, level)
	reserve := ink.Micrometre(0)
	if len(items) > 0 && d.class.Stripes {
		reserve = ink.Micrometre(len(items))*(small*4/3) + small/2
	}
	if len(items) > 0 && !d.class.Stripes {
		var ok bool
		if a.upper, ok = b.upperRows(items, d.panel.x+edge, d.panel.right()-edge, d.panel.y+500); !ok {
			return false
		}
	}
	var ok bool
	if a.name, ok = d.fitName(l, a.nameTop(a.upper, small), reserve); !ok {
		return false
	}
	b.top = max(d.middle, a.name.bottom)
	below := a.name.bottom
	if d.class.Line {
		a.line = d.line(a.name.bottom + 80)
		b.top = max(b.top, a.line.bottom()+100)
		below = a.line.bottom()
	}
	if len(items) > 0 && d.class.Stripes {
		left, right, _ := d.nameArea()
		a.upper, ok = b.upperRows(items, left, min(right, b.rightAt(d.middle)), below+100)
		if !ok || a.upper[len(a.upper)-1].base+small*31/100 > d.middle+small/4 {
			return false
		}
	}
	b.large = min(large, a.name.capital)
	a.large = b.large
	return a.fitLower(l, b, level)
}

// upperRows sets items row by row between left and right from y down.
func (b block) upperRows(items []item, left, right, y ink.Micrometre) ([]bin, bool) {
	size := b.size()
	var rows []bin
	for i, it := range items {
		if n := len(rows); n > 0 && rows[n-1].room(b.gap()) >= it.width(size) {
			rows[n-1].add(it, i, size, b.gap())
			continue
		}
		parts, ok := it.split(size, right-left)
		if !ok {
			return nil, false
		}
		for _, part := range parts {
			base := y + b.capital*112/100
			if n := len(rows); n > 0 {
				base = rows[n-1].base + b.capital*133/100
			}
			row := bin{base: base, left: left, right: right}
			row.add(part, i, size, b.gap())
			rows = append(rows, row)
		}
	}
	return rows, true
}

// fitLower arranges the lower half: rows far apart before near, each item on
// a row of its own before several together.
func (a *arrangement) fitLower(l labels.Label, b block, level int) bool {
	list, ok := b.concentrations(l)
	if !ok {
		return false
	}
	foot, more, ok := b.footRow(l)
	if !ok {
		return false
	}
	items := append(lowerItems(l, level), more...)
	for _, pitch := range []ink.Micrometre{165, 145, 133} {
		b.pitch = b.capital * pitch / 100
		base := list[len(list)-1].bin.base
		for _, joined := range []bool{false, true} {
			if rows, ok := b.inOrder(items, b.slots(base), joined); ok {
				a.stated, a.rows, a.foot = list, rows, foot
				return true
			}
		}
		beside, end := list[len(list)-1].bin, foot.copied()
		if b.design.class.Dim() || l.Second != "" {
			beside.right = beside.left
		}
		if rows, ok := b.byWidth(items, b.slots(base), &beside, &end); ok {
			list[len(list)-1].bin = beside
			a.stated, a.rows, a.foot = list, rows, end
			return true
		}
	}
	return false
}

// copied is the row with lists of its own.
func (r bin) copied() bin {
	r.items = append([]item{}, r.items...)
	r.order = append([]int{}, r.order...)
	return r
}
