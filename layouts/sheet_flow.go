package layouts

import (
	"fmt"
	"slices"

	"drawup/dilution/refusal"
	"drawup/labels"
	"drawup/labels/sheets"
	"drawup/layouts/ink"
)

// A slab is a piece of a sheet that is never split over pages. Its marks count
// from its own top left corner.
type slab struct {
	h     ink.Micrometre
	marks []ink.Mark
	keep  bool  // stays on the page of the slab after it
	head  *slab // printed again above it where it opens a page
}

// at are the marks of the slab with its corner at x, y.
func (b slab) at(x, y ink.Micrometre) []ink.Mark {
	out := make([]ink.Mark, len(b.marks))
	for i, m := range b.marks {
		out[i] = moved(m, x, y)
	}
	return out
}

// A format is the measures of one size of paper.
type format struct {
	w, h, margin, edge       ink.Micrometre
	body, small, table, head ink.Micrometre // em sizes
	caution, foot            ink.Micrometre // em sizes of cautions and of the foot
	gap, row                 ink.Micrometre // between parts, between rows
	write                    ink.Micrometre // height of a place to write in
	under                    ink.Micrometre // between the title and what follows
}

func formatOf(s sheets.Size) format {
	if s == sheets.A5 {
		return format{w: ink.MM(148), h: ink.MM(210), margin: ink.MM(9), edge: ink.Tenths(85), body: 2800, small: 2400, table: 2400, head: 3600,
			caution: 2400, foot: 2200, gap: 1300, row: 350, write: 5600, under: 2200}
	}
	return format{w: ink.MM(210), h: ink.MM(297), margin: ink.MM(15), edge: ink.MM(11), body: 3500, small: 2800, table: 3000, head: 5000,
		caution: 3000, foot: 2600, gap: 3300, row: 600, write: 7000, under: 3000}
}

// A flow fills the pages of one sheet.
type flow struct {
	sheet       sheets.Sheet
	f           format
	set         setter
	top, bottom ink.Micrometre
	y           ink.Micrometre
	pages       []ink.Page
	foot        footing
	refused     refusal.List
}

func newFlow(s sheets.Sheet) *flow {
	f := &flow{sheet: s, f: formatOf(s.Size)}
	f.set = setter{f: f.f, width: f.f.w - 2*f.f.margin, sheet: s, refused: &f.refused}
	f.foot = newFooting(f.set, s.Foot)
	f.top = f.f.edge + bold(f.f.head).lead() + f.f.under
	f.bottom = f.f.h - f.f.edge - f.foot.h - 1500
	f.set.room = f.bottom - f.top
	return f
}

// run places every part: whole on the rest of the page, else whole on a new
// page, else slab by slab. A sheet of one page is refused where it takes two.
func (f *flow) run() {
	f.open()
	parts := f.sheet.Parts
	if f.sheet.OnePage {
		parts = f.onOnePage()
	}
	for _, p := range parts {
		f.set.syringe = p.Syringe
		slabs := f.set.part(p)
		total := heightOf(slabs)
		if f.y > f.top {
			f.y += f.f.gap
		}
		if f.y+total > f.bottom && total <= f.bottom-f.top && f.y > f.top {
			f.open()
		}
		for i, b := range slabs {
			f.place(b, slabs[i:])
		}
	}
	if f.sheet.OnePage && len(f.pages) > 1 {
		f.set.syringe = f.sheet.Syringe
		f.set.tooLong(f.sheet.Of, "what fits on one page")
	}
}

// onOnePage leaves out the last of those cautions that may be left out, one
// after the other, until the sheet fits on a page or none is left.
func (f *flow) onOnePage() []sheets.Part {
	trial := f.set
	trial.refused = &refusal.List{}
	for fewer := 0; ; fewer++ {
		parts, more := shortened(f.sheet.Parts, fewer)
		h := -f.f.gap
		for _, p := range parts {
			h += heightOf(trial.part(p)) + f.f.gap
		}
		if h <= f.set.room || !more {
			return parts
		}
	}
}

// shortened leaves out the last cautions of a block that says where they stand
// otherwise, and says so. It is false when there are no more to leave out.
func shortened(parts []sheets.Part, fewer int) ([]sheets.Part, bool) {
	out := slices.Clone(parts)
	more := false
	for i := range out {
		out[i].Blocks = slices.Clone(out[i].Blocks)
		for j, b := range out[i].Blocks {
			c, ok := b.(sheets.Cautions)
			if !ok || c.Rest == "" || fewer == 0 {
				more = more || ok && c.Rest != "" && len(c.List) > 0
				continue
			}
			left := max(0, len(c.List)-fewer)
			more = more || left > 0
			out[i].Blocks[j] = sheets.Cautions{List: append(slices.Clone(c.List[:left]), sheets.Caution{Text: labels.Words(c.Rest)})}
		}
	}
	return out, more
}

// place sets one slab; with it must fit those that it stays with.
func (f *flow) place(b slab, rest []slab) {
	need := b.h
	for i := 0; i+1 < len(rest) && rest[i].keep; i++ {
		need += rest[i+1].h
	}
	if f.y+need > f.bottom && f.y > f.top {
		f.open()
		if b.head != nil {
			f.put(*b.head)
		}
	}
	if f.y+b.h > f.bottom {
		f.set.tooLong("a piece of the sheet", "a piece that fits on one page")
		return
	}
	f.put(b)
}

func (f *flow) put(b slab) {
	f.pages[len(f.pages)-1].Add(b.at(f.f.margin, f.y)...)
	f.y += b.h
}

// open begins a page with the sheet's title.
func (f *flow) open() {
	page := ink.Page{W: f.f.w, H: f.f.h}
	title, note := bold(f.f.head), bold(f.f.body)
	text, right := labels.Words(f.sheet.Title), labels.Words(f.sheet.Note)
	if len(f.pages) == 0 {
		page.Bookmark = f.sheet.Bookmark
	} else {
		text = labels.Words(f.sheet.Title + ", continued")
		if f.sheet.Of != "" {
			right = labels.Words(f.sheet.Of)
		}
	}
	m := f.f.margin
	page.Add(title.marks(m, f.f.edge, text)...)
	room := f.set.width - title.width(text) - 3000
	if note.width(right) > room {
		note = note.narrow()
	}
	if note.width(right) > room {
		f.set.tooLong(right.Text(), "words that fit beside the title of the sheet")
	}
	page.Add(note.marks(f.f.w-m-note.width(right), f.f.edge+title.base()-note.base(), right)...)
	page.Add(ink.Rule(m, f.top-f.f.under+400, f.set.width, 300))
	f.pages = append(f.pages, page)
	f.y = f.top
}

func heightOf(list []slab) ink.Micrometre {
	var h ink.Micrometre
	for _, b := range list {
		h += b.h
	}
	return h
}

// A footing is the foot of every page of a sheet.
type footing struct {
	slab slab
	h    ink.Micrometre
	f    format
}

// newFooting sets who, when, from which formulary, and the advice.
func newFooting(s setter, foot sheets.Foot) footing {
	h, strong := regular(s.f.foot), bold(s.f.foot)
	place := ""
	if foot.Place != "" {
		place = ", " + foot.Place
	}
	type row struct {
		hand hand
		text string
	}
	made := fmt.Sprintf("Made %s by %s%s. Digest %s.", foot.Made, foot.Preparer, place, foot.Digest)
	if foot.Preparer == "" { // a formulary is printed, not made
		made = fmt.Sprintf("Printed %s%s. Digest %s.", foot.Made, place, foot.Digest)
	}
	rows := []row{
		{h, made},
		{h, fmt.Sprintf("Formulary: %s, digest %s. State: %s.", foot.Formulary, foot.FormularyDigest, foot.State)},
	}
	if foot.LeftOut != "" {
		rows = append(rows, row{strong, foot.LeftOut})
	}
	last := sheets.Advice
	if foot.Invented {
		last += " INVENTED DEMONSTRATION: no patient, no prescription."
	}
	rows = append(rows, row{strong, last})
	out := footing{f: s.f}
	out.slab.marks = []ink.Mark{ink.Rule(0, 0, s.width, 200)}
	y := ink.Micrometre(700)
	for i, r := range rows {
		width := s.width
		if i == 0 {
			width -= ink.MM(24) // the page number stands there
		}
		for _, line := range s.rows(labels.Words(r.text), &r.hand, width) {
			out.slab.marks = append(out.slab.marks, r.hand.marks(0, y, line)...)
			y += r.hand.lead()
		}
	}
	out.h, out.slab.h = y, y
	return out
}

// marks is the foot of page n of the file.
func (t footing) marks(n, of int) []ink.Mark {
	y := t.f.h - t.f.edge - t.h
	out := t.slab.at(t.f.margin, y)
	h := bold(t.f.small)
	text := labels.Words(fmt.Sprintf("page %d of %d", n, of))
	return append(out, h.marks(t.f.w-t.f.margin-h.width(text), y+600, text)...)
}
