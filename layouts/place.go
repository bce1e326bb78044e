package layouts

import (
	"fmt"

	"drawup/dilution/recheck"
	"drawup/dilution/refusal"
	"drawup/labels"
	"drawup/layouts/ink"
)

// A Proof says that figures went through the second route; recheck.Passed is
// one. The zero Passed covers nothing.
type Proof interface{ Covers([]recheck.Figure) bool }

// Options of a sheet of labels.
type Options struct {
	// Used is the number of labels already used on the first sheet, along the
	// rows; it has no meaning on a roll.
	Used int
	// Mono leaves the class colours out. Stripes, bar and line stay, in black,
	// and the class word is printed in any case.
	Mono bool
	// Foot is printed at the edge of every sheet: made at, by, formulary,
	// digest.
	Foot []string
}

// Paper is the name under which the second route knows a label's figures.
const Paper = "label"

// Labels places labels on a stock, in the order of the list. passed[i] must
// cover every figure of list[i]. It refuses the whole list when one label is
// incomplete, not covered, has a letter that no face can show, or does not fit
// the stock: name, concentration and use-by are never cut, made smaller than
// their least size, or left out (R15). The line of the dose alone may be left
// out for want of room, with a caution in the list; the pages are there unless
// the list is Refused.
func Labels[P Proof](list []labels.Label, s Stock, passed []P, opt Options) ([]ink.Page, refusal.List) {
	refused := labels.OneScheme(list)
	if opt.Used < 0 || opt.Used >= s.PerPage() && !s.Roll() {
		refused = append(refused, refusal.Reason{Code: refusal.ValueUnknown, Severity: refusal.Refuse,
			Message: "More labels are said to be used than the sheet has.", Field: "skip",
			Got: fmt.Sprint(opt.Used), Want: fmt.Sprintf("0 to %d on stock %s", s.PerPage()-1, s.Name)})
	}
	whole := !refused.Refused()
	p := newPlacer(s, opt, len(list))
	for i, l := range list {
		if reasons := l.Check(); len(reasons) > 0 {
			refused, whole = append(refused, reasons...), false
			continue
		}
		if i >= len(passed) || !passed[i].Covers(l.Figures(Paper)) {
			refused, whole = append(refused, refusal.Reason{Code: refusal.RoutesDisagree, Severity: refusal.Refuse, Syringe: l.Number,
				Message: "The figures of the label of " + l.Name + " have not passed the second route.", Field: "label", Rule: "R17",
				Got: "figures that were not worked again", Want: "every figure worked again from the printed words",
				Remedy: "report this fault of the program; make the syringe by hand calculation"}), false
			continue
		}
		seen, modules, why := p.arranger.set(l)
		if why != nil {
			refused = append(refused, *why)
			whole = whole && why.Severity != refusal.Refuse
		}
		if whole {
			p.put(l, seen, modules)
		}
	}
	if refused.Refused() {
		return nil, refused
	}
	return p.pages, refused
}

// A placer puts labels on pages, one after the other.
type placer struct {
	stock     Stock
	opt       Options
	arranger  arranger
	pages     []ink.Page
	at, total int // place of the next label, number of pages
}

func newPlacer(s Stock, opt Options, count int) *placer {
	p := &placer{stock: s, opt: opt, arranger: newArranger(s, opt.Mono)}
	if !s.Roll() {
		p.at = opt.Used
	}
	per := s.PerPage()
	p.total = (p.at + count + per - 1) / per
	return p
}

// put places the next label.
func (p *placer) put(l labels.Label, seen pattern, modules []string) {
	s, per := p.stock, p.stock.PerPage()
	if p.at%per == 0 || len(p.pages) == 0 {
		page := ink.Page{W: s.PageW, H: s.PageH, Bookmark: bookmark(l, s, len(p.pages)+1, p.total)}
		if !s.Roll() {
			page.Marks = make([]ink.Mark, 0, 32+per*(len(seen.marks)+2))
			page.Add(s.edgeNote(p.opt.Foot, l.Class.Claim(), len(p.pages)+1, p.total)...)
		}
		p.pages = append(p.pages, page)
	}
	page := &p.pages[len(p.pages)-1]
	corner := s.Place(p.at % per)
	for i, mark := range seen.marks {
		switch m := mark.(type) {
		case ink.Text:
			if i == seen.serial {
				m.String = seen.before + l.Serial.Text
			}
			mark = m
		case ink.Symbol:
			m.Rows = modules
			mark = m
		}
		page.Add(moved(mark, corner.X, corner.Y))
	}
	if panel := s.panel(corner); s.Inset > 0 {
		page.Add(ink.Outlined(panel.x, panel.y, panel.w, panel.h, hairline, ink.Black))
	}
	p.at++
}

// moved is the mark further along and down the page.
func moved(mark ink.Mark, dx, dy ink.Micrometre) ink.Mark {
	switch m := mark.(type) {
	case ink.Text:
		m.X, m.Y = m.X+dx, m.Y+dy
		return m
	case ink.Rect:
		m.X, m.Y = m.X+dx, m.Y+dy
		return m
	case ink.Line:
		m.X1, m.Y1, m.X2, m.Y2 = m.X1+dx, m.Y1+dy, m.X2+dx, m.Y2+dy
		return m
	case ink.Polygon:
		points := make([]ink.Point, len(m.Points))
		for i, p := range m.Points {
			points[i] = ink.Point{X: p.X + dx, Y: p.Y + dy}
		}
		m.Points = points
		return m
	case ink.Symbol:
		m.X, m.Y = m.X+dx, m.Y+dy
		return m
	}
	return nil // the writer refuses a mark that is none of the five
}

func bookmark(l labels.Label, s Stock, page, total int) string {
	if s.Roll() {
		return fmt.Sprintf("%d %s", l.Number, l.Name)
	}
	return fmt.Sprintf("Labels, sheet %d of %d", page, total)
}
