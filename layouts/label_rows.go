package layouts

import (
	"sort"

	"drawup/labels"
	"drawup/layouts/ink"
)

// A block is the lower half of a label while its rows are fitted.
type block struct {
	design  design
	top     ink.Micrometre
	capital ink.Micrometre // of the small type
	large   ink.Micrometre // of the concentration
	pitch   ink.Micrometre // from one small baseline to the next
}

// A bin is one row of type: its baseline, its ends, and what stands on it.
type bin struct {
	base, left, right ink.Micrometre
	items             []item
	order             []int // of each item in the list
	used              ink.Micrometre
	taken             bool // by a line to write on that stands below
}

// size is the em size of the small type, which all its faces share.
func (b block) size() ink.Micrometre {
	return max(SizeFor(ink.CondensedRegular, b.capital), SizeFor(ink.CondensedSemiBold, b.capital))
}

// rightAt is the right end of a row of type that reaches down to low.
func (b block) rightAt(low ink.Micrometre) ink.Micrometre {
	if b.design.symbol.w > 0 && low > b.design.symbol.y-250 {
		return b.design.symbol.x - 400
	}
	return b.design.panel.right() - b.design.edge
}

func (b block) left() ink.Micrometre { return b.design.panel.x + b.design.edge }

// foot is the baseline of the class word. The white panel of a dim class ends
// a little above the edge.
func (b block) foot() ink.Micrometre {
	if b.design.class.Dim() && !b.design.mono {
		return b.design.panel.bottom() - 550
	}
	return b.design.panel.bottom() - 270 - (b.capital-smallLow)/2
}

// A stated is one concentration with its unit and what follows it in small
// type.
type stated struct {
	cell labels.Cell
	tail string
	face ink.Face
	bin  bin
}

// concentrations sets the one or two concentrations at the top of the block,
// in Bold, else or where rows are packed tighter in Condensed SemiBold.
func (b block) concentrations(l labels.Label, how packing) ([]stated, bool) {
	faces := []ink.Face{ink.Bold, ink.CondensedSemiBold}
	if how == tighter || how == tightest {
		faces = faces[1:]
	}
	list := []stated{{cell: l.Concentration, tail: l.As}}
	if l.Second != "" {
		list[0].tail = l.Name
		if l.As != "" {
			list[0].tail = l.Name + " " + l.As
		}
		list = append(list, stated{cell: l.SecondConcentration, tail: l.Second})
	}
	y := b.top + 60
	if b.large > concentrationLow {
		y += 120 + (b.large-concentrationLow)/4
	} else if b.design.class.Bar && b.design.panel.h > ink.MM(15) {
		y += 150
	}
	for i := range list {
		s := &list[i]
		base := y + b.large
		_, below := faceOf(ink.Bold).Extents(s.cell.Text, int64(SizeFor(ink.Bold, b.large)))
		low := base + ink.Micrometre(below)
		s.bin = bin{base: base, left: b.left(), right: b.rightAt(low)}
		fits := false
		for _, s.face = range faces {
			s.bin.used = b.statedWidth(*s)
			if fits = s.bin.used <= s.bin.right-s.bin.left; fits {
				break
			}
		}
		if !fits {
			return nil, false
		}
		y = low + 150
	}
	return list, true
}

func (b block) statedWidth(s stated) ink.Micrometre {
	w := Width(labels.Line{s.cell}, s.face, SizeFor(s.face, b.large))
	if s.tail != "" {
		w += b.capital*3/4 + Width(labels.Words(s.tail), ink.CondensedSemiBold, b.size())
	}
	return w
}

// slots are the rows between the concentration at base and the class word.
func (b block) slots(base ink.Micrometre) []bin {
	y := base + b.large/4 + b.pitch*9/10
	if b.large > concentrationLow {
		y = base + b.large*31/100 + b.pitch*9/10
	}
	var out []bin
	last := b.pitch
	if b.capital == smallLow {
		last = b.capital * 132 / 100 // the class word has no ascenders
	}
	for ; y+last <= b.foot(); y += b.pitch {
		out = append(out, bin{base: y, left: b.left(), right: b.rightAt(y + b.capital*31/100)})
	}
	return out
}

// footRow is the row of the class word, with the serial at its right end where
// there is room; else, and where rows are packed tightest, the serial is an
// item like the others.
func (b block) footRow(l labels.Label, how packing) (bin, []item, bool) {
	row := bin{base: b.foot(), left: b.left(), right: b.rightAt(b.foot())}
	word := item{line: labels.Words(l.Class.Word), face: ink.CondensedSemiBold}
	if word.width(b.size()) > row.right-row.left {
		return bin{}, nil, false
	}
	row.add(word, -1, b.size(), 0)
	if l.Serial.Text == "" {
		return row, nil, true
	}
	serial := plain(labels.Line{l.Serial})
	if how != tightest && row.room(b.gap()) >= serial.width(b.size()) {
		row.add(serial, 1000, b.size(), b.gap())
		return row, nil, true
	}
	// Away from its corner the number says what it is: it could be read as
	// part of an amount.
	return row, []item{plain(labels.Line{{Text: "no. "}, l.Serial})}, true
}

// gap parts two items on one row.
func (b block) gap() ink.Micrometre { return b.capital * 5 / 4 }

// room is what is left on a row for one more item.
func (r bin) room(gap ink.Micrometre) ink.Micrometre {
	left := r.right - r.left - r.used
	if len(r.items) > 0 || r.used > 0 {
		left -= gap
	}
	return left
}

func (r *bin) add(it item, order int, size, gap ink.Micrometre) {
	if len(r.items) > 0 || r.used > 0 {
		r.used += gap
	}
	r.used += it.width(size)
	r.items = append(r.items, it)
	r.order = append(r.order, order)
}

// inOrder fills the slots from the top: apart gives each item a row of its
// own, joined and dense let it follow another or stand beside the
// concentration. A line to write on takes as many rows as make writeHeight,
// its own the last of them.
func (b block) inOrder(items []item, slots []bin, how packing, beside *bin) ([]bin, bool) {
	size, at := b.size(), 0
	for i, it := range items {
		if how != apart && it.beside && at == 0 && beside.room(b.gap()) >= it.width(size) {
			beside.add(it, i, size, b.gap())
			continue
		}
		rows := int((writeHeight + b.pitch - 1) / b.pitch)
		if it.blank == 0 {
			rows = 1
		}
		if (how == joined && !it.start || how == dense) && at > 0 && slots[at-1].room(b.gap()) >= it.width(size) && (rows == 1 || slots[at-1].taken) {
			slots[at-1].add(it, i, size, b.gap())
			continue
		}
		at += rows - 1
		if at >= len(slots) {
			return nil, false
		}
		parts, ok := it.split(size, slots[at].right-slots[at].left)
		if !ok || at+len(parts) > len(slots) {
			return nil, false
		}
		for _, part := range parts {
			if part.width(size) > slots[at].right-slots[at].left {
				return nil, false
			}
			slots[at].add(part, i, size, b.gap())
			slots[at].taken = rows > 1
			at++
		}
	}
	return slots, true
}

// byWidth packs the items tightly, the widest first; short ones may stand
// beside the concentration or the class word. Rows keep the order of their
// first item. It takes neither lines to write on nor items that must wrap.
func (b block) byWidth(items []item, slots []bin, beside, foot *bin) ([]bin, bool) {
	size := b.size()
	narrow := b.rightAt(b.foot())
	var parts []item
	for _, it := range items {
		if it.blank > 0 || it.width(size) > narrow-b.left() {
			return nil, false
		}
		parts = append(parts, it)
	}
	order := make([]int, len(parts))
	for i := range order {
		order[i] = i
	}
	sort.SliceStable(order, func(i, j int) bool { return parts[order[i]].width(size) > parts[order[j]].width(size) })
	bases := make([]ink.Micrometre, len(slots))
	for i := range slots {
		bases[i], slots[i].right = slots[i].base, narrow
	}
	for _, i := range order {
		row := b.choose(parts[i], slots, beside, foot)
		if row == nil {
			return nil, false
		}
		row.add(parts[i], i, size, b.gap())
	}
	for _, row := range []*bin{beside, foot} {
		sort.Stable(row)
	}
	for i := range slots {
		sort.Stable(&slots[i])
	}
	sort.SliceStable(slots, func(i, j int) bool { return slots[i].first() < slots[j].first() })
	for i := range slots {
		slots[i].base = bases[i]
	}
	return slots, true
}

// choose finds the row for an item: an empty one, else the first with room.
func (b block) choose(it item, slots []bin, beside, foot *bin) *bin {
	width := it.width(b.size())
	if it.beside && beside.room(b.gap()) >= width {
		return beside
	}
	for i := range slots {
		if len(slots[i].items) == 0 {
			return &slots[i]
		}
	}
	for i := range slots {
		if slots[i].room(b.gap()) >= width {
			return &slots[i]
		}
	}
	_, dips := faceOf(it.face).Extents(it.line.Text(), int64(b.size()))
	if it.foot && foot.room(b.gap()) >= width && foot.base+ink.Micrometre(dips) <= b.design.panel.bottom() {
		return foot
	}
	return nil
}

// first is the place of the row's first item in the list; empty rows come last.
func (r bin) first() int {
	if len(r.order) == 0 {
		return 1 << 30
	}
	return r.order[0]
}

// Len, Less and Swap sort the items of a row by their order.
func (r *bin) Len() int           { return len(r.items) }
func (r *bin) Less(i, j int) bool { return r.order[i] < r.order[j] }
func (r *bin) Swap(i, j int) {
	r.items[i], r.items[j] = r.items[j], r.items[i]
	r.order[i], r.order[j] = r.order[j], r.order[i]
}
