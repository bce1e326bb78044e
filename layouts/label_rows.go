package layouts

import (
	"cmp"
	"slices"

	"drawup/labels"
	"drawup/layouts/ink"
)

// A block is the lower half of a label while its rows are fitted.
type block struct {
	design  design
	top     ink.Micrometre // where the concentration may begin
	capital ink.Micrometre // of the small type
	size    ink.Micrometre // em size of it, which all its faces share
	pitch   ink.Micrometre // from one small baseline to the next
	gap     ink.Micrometre // between two items on one row
}

func newBlock(d design, top, capital ink.Micrometre) block {
	size := max(SizeFor(ink.CondensedRegular, capital), SizeFor(ink.CondensedSemiBold, capital))
	return block{design: d, top: top, capital: capital, size: size, gap: capital * 3 / 4}
}

// A bin is one row of type: its baseline, its ends, and what stands on it.
type bin struct {
	base, left, right ink.Micrometre
	items             []item
	used              ink.Micrometre
	taken             bool // by a line to write on
}

// symbolAir parts type from the white panel of the barcode, which holds the
// quiet zone already.
const symbolAir = 50

// rightAt is the right end of a row of type that reaches down to low.
func (b block) rightAt(low ink.Micrometre) ink.Micrometre {
	if b.design.symbol.w > 0 && low > b.design.symbol.y-symbolAir {
		return b.design.symbol.x - 250
	}
	return b.design.panel.right() - b.design.edge
}

func (b block) left() ink.Micrometre { return b.design.panel.x + b.design.edge }

// foot is the baseline of the class word, 0.8 mm clear of the edge; on the
// label of 15 mm, which has no room for it, 0.3 mm.
func (b block) foot() ink.Micrometre {
	if b.design.panel.h <= ink.MM(15) {
		return b.design.panel.bottom() - 300
	}
	return b.design.panel.bottom() - 800
}

// slots are n rows above that of the class word.
func (b block) slots(n int) []bin {
	out := make([]bin, n)
	for i := range out {
		base := b.foot() - ink.Micrometre(n-i)*b.pitch
		out[i] = bin{base: base, left: b.left(), right: b.rightAt(base + b.capital*drop/100)}
	}
	return out
}

// room is what is left on a row for one more item.
func (r bin) room(gap ink.Micrometre) ink.Micrometre {
	left := r.right - r.left - r.used
	if r.used > 0 {
		left -= gap
	}
	return left
}

func (r *bin) add(it item, size, gap ink.Micrometre) {
	if r.used > 0 {
		r.used += gap
	}
	r.used += it.width(size)
	r.items = append(r.items, it)
}

// A stated is one concentration with its unit and what follows it in small
// type.
type stated struct {
	cell labels.Cell
	tail string
	wide [2]span // of the cell in each of statedFaces
	dips span    // below the baseline
	tags span    // of the tail
	face int     // of statedFaces
	bin  bin
}

// statedFaces are the faces that a concentration may have, the best first.
func statedFaces() [2]ink.Face { return [2]ink.Face{ink.Bold, ink.CondensedSemiBold} }

// statedOf lists the one or two concentrations.
func statedOf(l labels.Label) []stated {
	list := []stated{{cell: l.Concentration, tail: l.As}}
	if l.Second != "" {
		list[0].tail = l.Name
		if l.As != "" {
			list[0].tail = l.Name + " " + l.As
		}
		list = append(list, stated{cell: l.SecondConcentration, tail: l.Second})
	}
	for i := range list {
		s := &list[i]
		for k, f := range statedFaces() {
			s.wide[k] = spanOf(s.cell.Text, f)
		}
		_, s.dips = reachOf(s.cell.Text, ink.Bold)
		s.tags = spanOf(s.tail, ink.CondensedSemiBold)
	}
	return list
}

// concentrationAir parts the concentration from the upper half; more below a
// black bar.
func (b block) concentrationAir() ink.Micrometre {
	if b.design.class.Bar {
		return 300
	}
	return 120
}

// concentrations sets list in the room above end, each in the first of the
// faces from first on that fits. What is to spare beyond 0.25 mm below is shared
// above and below.
func (b block) concentrations(list []stated, first int, large, end ink.Micrometre) bool {
	air := b.concentrationAir()
	if large > concentrationLow {
		air += 240
		end -= 250
	}
	y := b.top + air
	need := y
	bold := SizeFor(ink.Bold, large)
	for i, s := range list {
		need += large + s.dips.at(bold)
		if i > 0 {
			need += statedAir(large)
		}
	}
	if need > end {
		return false
	}
	down := min(max(end-need-250, 0)/2, 700)
	dips := b.capital * drop / 100
	if low := y + large + dips; b.rightAt(low+down) < b.rightAt(low) {
		down = 0 // lower down it would meet the barcode
	}
	y += down
	for i := range list {
		s := &list[i]
		base, low := y+large, y+large+s.dips.at(bold)
		s.bin = bin{base: base, left: b.left(), right: b.rightAt(base + dips)}
		fits := false
		for s.face = first; s.face < len(s.wide); s.face++ {
			s.bin.used = b.statedWidth(*s, large)
			if fits = s.bin.used <= b.rightAt(low)-s.bin.left; fits {
				break
			}
		}
		if !fits {
			return false
		}
		y = low + statedAir(large)
	}
	return true
}

// statedAir parts two concentrations: the upper one's tails from the dots and
// stems of the lower one, which rise above its capitals.
func statedAir(large ink.Micrometre) ink.Micrometre { return 150 + large*(rise-100)/100 }

func (b block) statedWidth(s stated, large ink.Micrometre) ink.Micrometre {
	w := s.wide[s.face].at(SizeFor(statedFaces()[s.face], large))
	if s.tail != "" {
		w += b.capital*3/4 + s.tags.at(b.size)
	}
	return w
}

// footRow is the row of the class word and its right end: the serial, before
// it what else has room. What has none is returned to stand on a row above; a
// serial away from its corner says what it is, as it could be read as part of
// an amount.
func (b block) footRow(l labels.Label, c content) (word, right bin, rest []item, ok bool) {
	word = bin{base: b.foot(), left: b.left(), right: b.rightAt(b.foot())}
	if c.word.width(b.size) > word.right-word.left {
		return bin{}, bin{}, nil, false
	}
	word.add(c.word, b.size, b.gap)
	right = word
	right.items = nil
	if l.Serial.Text != "" {
		if word.room(b.gap) >= c.serial.width(b.size) {
			right.add(c.serial, b.size, b.gap)
		} else {
			it := plain(labels.Line{{Text: "no. "}, l.Serial})
			it.serial, it.late = true, true
			rest = append(rest, it)
		}
	}
	for _, it := range c.foot {
		if right.room(b.gap) >= it.width(b.size) {
			right.add(it, b.size, b.gap)
			right.items = append([]item{it}, right.items[:len(right.items)-1]...)
		} else {
			rest = append([]item{it}, rest...)
		}
	}
	return word, right, rest, true
}

// A packing is a way to put items on rows, in their order in any case.
type packing int

const (
	apart   packing = iota + 1 // each item on a row of its own
	grouped                    // an item may follow another, but some begin a row
	filling                    // the same, late items wherever there is room
	dense                      // any item may follow another
)

// pack fills the slots from the top. A line to write on takes as many rows as
// make writeHeight, its own the last of them.
func (b block) pack(items []item, slots []bin, how packing, beside *bin) bool {
	at := 0
	var late []item
	for _, it := range items {
		if how == filling && it.late {
			late = append(late, it)
			continue
		}
		rows := 1
		if it.blank > 0 {
			rows = int((writeHeight + b.pitch - 1) / b.pitch)
		}
		follow := how == dense || how != apart && !it.start
		if follow && at > 0 && slots[at-1].room(b.gap) >= it.width(b.size) && (rows == 1 || slots[at-1].taken) {
			slots[at-1].add(it, b.size, b.gap)
			continue
		}
		at += rows - 1
		if at >= len(slots) {
			return false
		}
		parts, ok := it.split(b.size, slots[at].right-slots[at].left)
		if !ok || at+len(parts) > len(slots) {
			return false
		}
		for _, part := range parts {
			if part.width(b.size) > slots[at].right-slots[at].left {
				return false
			}
			slots[at].add(part, b.size, b.gap)
			slots[at].taken = rows > 1
			at++
		}
	}
	return b.fill(late, slots, beside)
}

// fill puts late items, the widest first, on the first row with room: before
// others beside the concentration when nothing else stands there, after them
// when something does.
func (b block) fill(late []item, slots []bin, beside *bin) bool {
	slices.SortStableFunc(late, func(a, b item) int { return cmp.Compare(b.span, a.span) })
	for _, it := range late {
		row := -1
		for i := range slots {
			if slots[i].room(b.gap) >= it.width(b.size) {
				row = i
				break
			}
		}
		switch {
		case len(beside.items) == 0 && beside.room(b.gap) >= it.width(b.size):
			beside.add(it, b.size, b.gap)
		case row >= 0:
			slots[row].add(it, b.size, b.gap)
		case beside.room(b.gap) >= it.width(b.size):
			beside.add(it, b.size, b.gap)
		default:
			return false
		}
	}
	return true
}
