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
	full    ink.Micrometre // greatest capital height of the name without small type above it
	line    box            // reversal line, empty without
	size    ink.Micrometre
	fitted  fitted
	large   ink.Micrometre
	upper   []bin
	stated  []stated
	rows    []bin
	foot    bin
}

// An attempt is one try at the label: its sizes of type, how rows are filled,
// and how much of the name's greatest size must be left when small type stands
// in the upper half with it, in per cent.
type attempt struct {
	level        int
	small, large ink.Micrometre // heights of capitals of small type and concentration
	ways         []packing
	share        ink.Micrometre
}

// A pass is a row of attempts from large type to small.
type pass struct {
	steps  []ink.Micrometre // of the ladder of sizes
	levels int              // how many to try
	ways   []packing
	share  ink.Micrometre
}

// passes are tried in groups. The first: every item on a row of its own in the
// lower half, down to 1.36 mm; then rows shared and some of the small type in
// the upper half. The second: rows shared more freely. The last, for labels
// that would be refused else: the name gives way as far as 2.5 mm.
func passes() [][]pass {
	every := []ink.Micrometre{12, 11, 10, 9, 8, 7, 6, 5, 4, 3, 2, 1, 0}
	shared := []packing{apart, joined, tight, tighter, tightest}
	return [][]pass{
		{{every[:11], 1, []packing{apart}, 0}, {every, 4, shared, 75}},
		{{every, 4, []packing{dense}, 75}},
		{{every, 4, append(shared, dense), 0}},
	}
}

// arrange finds the largest type with which the label fits its panel, for each
// group of passes first with the best size of barcode module and then with the
// smaller ones. When none fits it says what did not.
func arrange(l labels.Label, panel box, s Stock, mono bool, modules []string) (arrangement, string) {
	widths := []ink.Micrometre{0}
	if len(modules) > 0 {
		widths = widths[:0]
		for _, dots := range s.Dots {
			widths = append(widths, s.module(dots))
		}
	}
	why := "its barcode"
	for _, group := range passes() {
		for _, module := range widths {
			symbol, ok := symbolBox(panel, s, module, len(modules))
			if !ok {
				continue
			}
			a := arrangement{design: newDesign(panel, s, l.Class, mono, symbol), modules: modules, module: module}
			_, _, top := a.design.nameArea()
			name, ok := a.design.fitName(l, top, 0)
			if !ok {
				why = "the drug name in capitals of 2.5 mm"
				continue
			}
			a.full = name.capital
			for _, p := range group {
				if a.fit(l, p) {
					return a, ""
				}
			}
			why = "its lines in the smallest type allowed"
		}
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

// fit tries a pass, and within each size of type more and more of the small
// type in the upper half.
func (a *arrangement) fit(l labels.Label, p pass) bool {
	for _, k := range p.steps {
		for level := range p.levels {
			if level > 0 && len(upperItems(l, level)) == len(upperItems(l, level-1)) {
				continue
			}
			t := attempt{level, smallLow + 80*k, concentrationLow + 250*k, p.ways, p.share}
			if a.set(l, t) {
				a.grow(l, t)
				return true
			}
		}
	}
	return false
}

// grow makes the concentration larger as long as all still fits.
func (a *arrangement) grow(l labels.Label, t attempt) {
	for t.large = a.large + 100; t.large <= 5000; t.large += 100 {
		larger := *a
		if !larger.set(l, t) || larger.large <= a.large {
			return
		}
		*a = larger
	}
}

// set makes one attempt. The concentration is at most 85 % of the name.
func (a *arrangement) set(l labels.Label, t attempt) bool {
	small := t.small
	d := a.design
	b := block{design: d, capital: small}
	a.size, a.upper, a.line = b.size(), nil, box{}
	items := upperItems(l, t.level)
	reserve := ink.Micrometre(0)
	if len(items) > 0 && d.class.Stripes {
		reserve = ink.Micrometre(len(items))*(small*4/3) + (small-smallLow)/2
	}
	if len(items) > 0 && !d.class.Stripes {
		var ok bool
		if a.upper, ok = b.upperRows(items, d.panel.x+d.edge, d.panel.right()-d.edge, d.panel.y+500); !ok {
			return false
		}
	}
	var ok bool
	if a.name, ok = a.fitted.fit(d, l, a.nameTop(a.upper, small), reserve); !ok {
		return false
	}
	if a.name.capital*100 < a.full*t.share {
		return false
	}
	b.top = max(d.middle, a.name.bottom)
	below := a.name.bottom
	if d.class.Line {
		a.line = d.line(a.name.bottom + 80)
		b.top = max(b.top, a.line.bottom()+50)
		below = a.line.bottom()
	}
	if len(items) > 0 && d.class.Stripes {
		left, right, _ := d.nameArea()
		a.upper, ok = b.upperRows(items, left, min(right, b.rightAt(d.middle)), below+80+(small-smallLow)/3)
		if !ok || a.upper[len(a.upper)-1].base+small*31/100 > d.middle+small/4 {
			return false
		}
		b.top = max(b.top, a.upper[len(a.upper)-1].base+small*31/100)
	}
	b.large = min(t.large, max(concentrationLow, a.name.capital*85/100))
	a.large = b.large
	return a.fitLower(l, b, t)
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
func (a *arrangement) fitLower(l labels.Label, b block, t attempt) bool {
	for _, pitch := range pitches(b.capital) {
		b.pitch = b.capital * pitch / 100
		for _, how := range t.ways {
			if a.packed(l, b, lowerItems(l, t.level), how) {
				return true
			}
		}
	}
	return false
}

// packed arranges the lower half in one way.
func (a *arrangement) packed(l labels.Label, b block, items []item, how packing) bool {
	list, ok := b.concentrations(l, how)
	if !ok {
		return false
	}
	foot, more, ok := b.footRow(l, how)
	if !ok {
		return false
	}
	last := &list[len(list)-1].bin
	beside := *last
	if b.design.class.Dim() || l.Second != "" {
		beside.right = beside.left // nothing stands there
	}
	rows, ok := b.pack(how, append(items, more...), &beside, &foot)
	if !ok {
		return false
	}
	last.items, last.order, last.used = beside.items, beside.order, beside.used
	a.stated, a.rows, a.foot = list, rows, foot
	return true
}

// A packing is a way to put items on rows.
type packing int

const (
	apart    packing = iota + 1 // each item on a row of its own
	joined                      // in order, several on a row, the use-by first on its row
	dense                       // in order, several on a row
	tight                       // the widest first
	tighter                     // the same with the concentration condensed
	tightest                    // the same with the serial among the items
)

func (b block) pack(how packing, items []item, beside, foot *bin) ([]bin, bool) {
	slots := b.slots(beside.base)
	switch how {
	case apart, joined, dense:
		return b.inOrder(items, slots, how, beside)
	case tight, tighter, tightest:
		return b.byWidth(items, slots, beside, foot)
	}
	return nil, false
}

// pitches are the distances of rows to try, in hundredths of the capital
// height. Only the smallest type is set close.
func pitches(capital ink.Micrometre) []ink.Micrometre {
	if capital > smallLow {
		return []ink.Micrometre{165, 152}
	}
	return []ink.Micrometre{165, 152, 140, 133}
}

// copied is the row with lists of its own.
func (r bin) copied() bin {
	r.items = append([]item{}, r.items...)
	r.order = append([]int{}, r.order...)
	return r
}
