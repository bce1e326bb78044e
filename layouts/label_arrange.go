package layouts

import (
	"drawup/labels"
	"drawup/layouts/ink"
)

// An arrangement is a label with everything in its place.
type arrangement struct {
	design  design
	side    int // of the barcode in modules, 0 without
	module  ink.Micrometre
	name    named
	line    box // reversal line, empty without
	strips  []bin
	size    ink.Micrometre // em size of the small type
	capital ink.Micrometre // its capitals
	gap     ink.Micrometre // between two items on one row
	large   ink.Micrometre // capitals of the concentration
	stated  []stated
	rows    []bin
	foot    bin // class word
	right   bin // what stands at the right end of its row
	chosen  choice
}

// A choice is how the search for an arrangement ended: with it a label whose
// texts are as wide is arranged without a search.
type choice struct {
	tier   int
	form   int // of the code
	module ink.Micrometre
	small  ink.Micrometre
	way    way
	large  ink.Micrometre
}

// A tier is a way to fill a label; the next is tried only when no form of the
// code in no size of module makes this one fit.
type tier struct {
	where  place
	strips int            // rows of small type along the top edge
	large  ink.Micrometre // least capitals of the concentration
	tight  bool
}

// tiers are those of a label with stripes, which leave no room at the top
// edge, or of one without.
func tiers(c labels.Class) []tier {
	if c.Stripes {
		return []tier{{below, 0, concentrationLow, false}, {below, 0, concentrationLast, false}, {below, 0, concentrationLast, true}}
	}
	return []tier{
		{atEdge, 1, concentrationLow, false}, {allAbove, 1, concentrationLow, false}, {allAbove, 2, concentrationLow, false},
		{atEdge, 1, concentrationLast, true}, {allAbove, 1, concentrationLast, true}, {allAbove, 2, concentrationLast, true},
	}
}

// tallLabel is the height from which a label has room for larger type.
const tallLabel = 20_000

// smallSteps are the heights of capitals that small type may have.
func smallSteps(panel box) []ink.Micrometre {
	if panel.h >= tallLabel {
		return []ink.Micrometre{2200, 1900, 1650, 1450, 1300, smallLow}
	}
	return []ink.Micrometre{1500, 1350, smallLow}
}

// largeSteps are the heights of capitals that the concentration may have above
// the least.
func largeSteps() []ink.Micrometre {
	return []ink.Micrometre{5000, 4200, 3600, 3000, 2600, 2300, concentrationLow}
}

// A way is how rows are filled and how far apart they are, in hundredths of
// the capital height.
type way struct {
	how   packing
	pitch ink.Micrometre
}

// ways are tried in turn. Only the smallest type is set close.
func ways(capital ink.Micrometre, tight bool) []way {
	switch {
	case tight:
		return []way{{filling, 150}, {filling, 129}}
	case capital > smallLow:
		return []way{{apart, 165}, {grouped, 165}, {apart, 150}, {grouped, 150}}
	}
	return []way{{apart, 150}, {grouped, 150}, {apart, 129}, {grouped, 129}, {dense, 150}, {dense, 129}}
}

// arrange finds the first tier with which the label fits its panel, and in it the
// fullest form of the code. When none fits it says what did not.
func arrange(l labels.Label, panel box, s Stock, mono bool, symbols []symbol) (arrangement, string) {
	f := fitting{label: l, panel: panel, stock: s, mono: mono, why: "its barcode"}
	for i, t := range tiers(l.Class) {
		if i == 0 || t.where != f.where {
			f.content, f.where = contentOf(l, t.where), t.where
		}
		f.tier, f.number = t, i
		if a, ok := f.fullest(symbols); ok {
			return a, ""
		}
	}
	return arrangement{}, f.why
}

// A fitting is the search for an arrangement in one tier after the other.
type fitting struct {
	label   labels.Label
	panel   box
	stock   Stock
	mono    bool
	content content
	where   place
	tier    tier
	number  int
	why     string // what did not fit
}

// fullest takes the shortest form of the code as the measure: on a low label a
// fuller one is taken only where it makes no type smaller and sets no rows
// closer; on a label with room for larger type, wherever it fits.
func (f *fitting) fullest(symbols []symbol) (arrangement, bool) {
	if len(symbols) == 0 {
		return f.with(codeSize{})
	}
	last := len(symbols) - 1
	anything := func(arrangement) bool { return true }
	least, ok := f.form(symbols, last, anything)
	good := func(a arrangement) bool {
		return f.panel.h >= tallLabel || !ok || a.chosen.costsNothing(least.chosen)
	}
	for i := range last {
		if a, fits := f.form(symbols, i, good); fits {
			return a, true
		}
	}
	return least, ok
}

// costsNothing says whether the type of one choice is as large and as far apart
// as that of another.
func (c choice) costsNothing(other choice) bool {
	return c.small >= other.small && c.large >= other.large && c.way.pitch >= other.way.pitch
}

// moduleLow is the least side of a module: 0.255 mm, the least of GS1 DataMatrix
// on healthcare items [unverified: the table was not seen].
const moduleLow = 255

// form arranges the label with one form of the code, in the best size of module
// with which it fits and is good.
func (f *fitting) form(symbols []symbol, i int, good func(arrangement) bool) (arrangement, bool) {
	for _, dots := range f.stock.Dots {
		module := f.stock.module(dots)
		if dots < 2 || module < moduleLow {
			continue // no scanner could be relied on
		}
		if a, ok := f.with(codeSize{i, symbols[i].side, module, i == len(symbols)-1}); ok && good(a) {
			return a, true
		}
	}
	return arrangement{}, false
}

// with arranges the label with a code of one size.
func (f *fitting) with(code codeSize) (arrangement, bool) {
	symbol, ok := symbolBox(f.panel, f.stock, code)
	if !ok {
		return arrangement{}, false
	}
	a := arrangement{design: newDesign(f.panel, f.stock, f.label.Class, f.mono, symbol), side: code.side, module: code.module}
	now := f.content
	if !a.upper(f.label, &now, f.tier.strips) {
		f.why = "the drug name in capitals of 2.5 mm"
		return arrangement{}, false
	}
	if !a.lower(f.label, now, f.tier) {
		f.why = "its lines in the smallest type allowed"
		return arrangement{}, false
	}
	a.chosen.tier, a.chosen.form, a.chosen.module = f.number, code.form, code.module
	return a, true
}

// repeat arranges a label by a choice that was made for another with texts of
// the same widths.
func repeat(l labels.Label, panel box, s Stock, mono bool, symbols []symbol, made choice) (arrangement, bool) {
	t := tiers(l.Class)[made.tier]
	code := codeSize{}
	if len(symbols) > 0 {
		code = codeSize{made.form, symbols[made.form].side, made.module, made.form == len(symbols)-1}
	}
	symbol, ok := symbolBox(panel, s, code)
	if !ok {
		return arrangement{}, false
	}
	a := arrangement{design: newDesign(panel, s, l.Class, mono, symbol), side: code.side, module: made.module}
	c := contentOf(l, t.where)
	if !a.upper(l, &c, t.strips) {
		return arrangement{}, false
	}
	b := a.block(made.small, t)
	b.pitch = made.small * made.way.pitch / 100
	a.size, a.capital, a.gap = b.size, made.small, b.gap
	a.chosen = made
	return a, a.place(l, c, b, made.way.how, made.large)
}

// A codeSize is one form of the code with modules of one size.
type codeSize struct {
	form, side int
	module     ink.Micrometre
	last       bool // there is no shorter form
}

// symbolBox is the white panel of the barcode, quiet zone of one module
// included, in the lower right. On a roll it stays clear of the cut edge. The
// shortest form may rise at most 1.5 mm above the middle of the label; a fuller
// one stays below it, so that it never costs the name any of its size.
func symbolBox(panel box, s Stock, code codeSize) (box, bool) {
	if code.side == 0 {
		return box{}, true
	}
	rise := ink.Micrometre(0)
	if code.last {
		rise = 1500
	}
	off := ink.Micrometre(0)
	if s.Inset == 0 {
		off = 300
	}
	side := ink.Micrometre(code.side+2) * code.module
	b := box{panel.right() - side - off, panel.bottom() - side - off, side, side}
	return b, b.y >= panel.y+panel.h/2-rise && b.x > panel.x+panel.w/2
}

// Baseline of the first row of small type below the top edge, from there to
// the next, and what parts two items: two marks and a digest of any eight
// letters fit one row of the sheet of 65.
const (
	stripBase  = 1750
	stripPitch = 1560
	stripGap   = 600
)

// upper places small type along the top edge, name and reversal line. What
// has no room at the top edge is put among the other small type.
func (a *arrangement) upper(l labels.Label, c *content, strips int) bool {
	d := a.design
	b := newBlock(d, 0, smallLow)
	for i := range strips {
		a.strips = append(a.strips, bin{base: d.panel.y + stripBase + ink.Micrometre(i)*stripPitch, left: d.panel.x + 300, right: d.panel.right() - d.edge})
	}
	at := 0
	for _, it := range c.strip {
		for at < strips && a.strips[at].room(stripGap) < it.width(b.size) {
			at++
		}
		if at == strips {
			c.rows = append(c.rows[:len(c.rows):len(c.rows)], it)
			continue
		}
		a.strips[at].add(it, b.size, stripGap)
	}
	_, _, top := d.nameArea()
	if strips > 0 {
		// The room is kept without any words too: names stand alike.
		top = a.strips[strips-1].base + smallLow*drop/100 + 80
	}
	var ok bool
	if a.name, ok = d.fitName(l, top); !ok {
		return false
	}
	if d.class.Line {
		// A little over the end of the stripes, so that no sliver shows below it.
		a.line = d.line(max(a.name.bottom+lineAir, d.legEnd-d.lineHeight()+lineOver))
	}
	return true
}

// block is the lower half below name and reversal line.
func (a *arrangement) block(small ink.Micrometre, t tier) block {
	top := max(a.design.middle, a.name.bottom)
	if a.design.class.Line {
		top = max(top, a.line.bottom()+50)
	}
	b := newBlock(a.design, top, small)
	if t.tight {
		b.gap = small / 2
	}
	return b
}

// lower finds the largest small type with which the lower half fits, and then
// the largest concentration.
func (a *arrangement) lower(l labels.Label, c content, t tier) bool {
	most := a.name.capital * 85 / 100
	for _, small := range smallSteps(a.design.panel) {
		b := a.block(small, t)
		large := min(t.large+(small-smallLow)*2, max(most, t.large))
		for _, w := range ways(small, t.tight) {
			b.pitch = small * w.pitch / 100
			if !a.place(l, c, b, w.how, large) {
				continue
			}
			a.size, a.capital, a.gap = b.size, small, b.gap
			a.grow(l, c, b, w.how, most)
			a.chosen = choice{small: small, way: w, large: a.large}
			return true
		}
	}
	return false
}

// grow makes the concentration larger as long as all still fits and nothing
// has to leave its row for it. It is at most 85 % of the name.
func (a *arrangement) grow(l labels.Label, c content, b block, how packing, most ink.Micrometre) {
	for _, large := range largeSteps() {
		if large > most {
			continue
		}
		if large <= a.large {
			return
		}
		larger := *a
		if larger.place(l, c, b, how, large) && larger.like(*a) {
			*a = larger
			return
		}
	}
}

// like says whether the same stands beside the concentrations, in the same
// faces.
func (a arrangement) like(o arrangement) bool {
	for i, s := range a.stated {
		if s.face != o.stated[i].face || len(s.bin.items) != len(o.stated[i].bin.items) {
			return false
		}
	}
	return true
}

// place arranges the lower half with as few rows as it takes.
func (a *arrangement) place(l labels.Label, c content, b block, how packing, large ink.Micrometre) bool {
	word, right, more, ok := b.footRow(l, c)
	if !ok {
		return false
	}
	items := append(c.rows[:len(c.rows):len(c.rows)], more...)
	for n := 0; ; n++ {
		end := b.foot() - ink.Micrometre(n)*b.pitch - b.capital*102/100
		if end <= b.top {
			return false
		}
		list, rest, ok := b.head(c.stated, items, how, large, end)
		if !ok && n == 0 {
			continue // a row further up may be wider
		}
		if !ok {
			return false
		}
		beside := &list[len(list)-1].bin
		if len(list) > 1 {
			beside = &bin{} // nothing stands beside two concentrations
		}
		slots := b.slots(n)
		if b.pack(rest, slots, how, beside) {
			a.large, a.stated, a.rows, a.foot, a.right = large, list, slots, word, right
			return true
		}
	}
}

// head sets the concentration and beside it, against the right end, the
// amount. It is in Bold; in Condensed SemiBold where it does not fit else, or
// where that makes room for the amount.
func (b block) head(said []stated, items []item, how packing, large, end ink.Micrometre) ([]stated, []item, bool) {
	list := append([]stated{}, said...)
	alone := len(list) > 1 || len(items) == 0 || !items[0].beside
	first := 0
	if how == filling {
		first = 1
	}
	if !b.concentrations(list, first, large, end) {
		return nil, nil, false
	}
	if alone {
		return list, items, true
	}
	if first == 0 && list[0].bin.room(b.gap) < items[0].width(b.size) {
		bold := list[0]
		b.concentrations(list, 1, large, end)
		if list[0].bin.room(b.gap) < items[0].width(b.size) {
			list[0] = bold
		}
	}
	for len(items) > 0 && items[0].beside && list[0].bin.room(b.gap) >= items[0].width(b.size) {
		list[0].bin.add(items[0], b.size, b.gap)
		items = items[1:]
	}
	return list, items, true
}
