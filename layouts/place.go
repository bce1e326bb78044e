package layouts

import (
	"fmt"
	"strings"

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
	// Skip is the number of labels already used on the first sheet, along the
	// rows; it has no meaning on a roll.
	Skip int
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
	var refused refusal.List
	if opt.Skip < 0 || opt.Skip >= s.PerPage() && !s.Roll() {
		refused = append(refused, refusal.Reason{Code: refusal.ValueUnknown, Severity: refusal.Refuse,
			Message: "More labels are said to be used than the sheet has.", Field: "skip",
			Got: fmt.Sprint(opt.Skip), Want: fmt.Sprintf("0 to %d on stock %s", s.PerPage()-1, s.Name)})
	}
	drawn := make([]arranger, len(list))
	for i, l := range list {
		if reasons := l.Check(); len(reasons) > 0 {
			refused = append(refused, reasons...)
			continue
		}
		if i >= len(passed) || !passed[i].Covers(l.Figures(Paper)) {
			refused = append(refused, refusal.Reason{Code: refusal.RoutesDisagree, Severity: refusal.Refuse, Syringe: l.Number,
				Message: "The figures of the label of " + l.Name + " have not passed the second route.", Field: "label", Rule: "R17",
				Got: "figures that were not worked again", Want: "every figure worked again from the printed words",
				Remedy: "report this fault of the program; make the syringe by hand calculation"})
			continue
		}
		var why *refusal.Reason
		if drawn[i], why = newArranger(l, s, opt.Mono); why != nil {
			refused = append(refused, *why)
		}
	}
	if refused.Refused() {
		return nil, refused
	}
	return pagesOf(drawn, s, opt), refused
}

// An arranger is a label that is known to fit its stock.
type arranger struct {
	label    labels.Label
	modules  []string
	arranged arrangement // on a label at 0, 0
}

// newArranger makes sure that the label fits the stock, and says why not.
func newArranger(l labels.Label, s Stock, mono bool) (arranger, *refusal.Reason) {
	if missing := missingRunes(l); len(missing) > 0 {
		return arranger{}, &refusal.Reason{Code: refusal.GlyphMissing, Severity: refusal.Refuse, Syringe: l.Number,
			Message: fmt.Sprintf("The label of %s has letters that cannot be printed: %q.", l.Name, string(missing)), Field: "label",
			Got: fmt.Sprintf("%q", string(missing)), Want: "letters of the embedded faces", Remedy: "spell it in other letters"}
	}
	a := arranger{label: l}
	if l.Code.Text != "" {
		var err error
		if a.modules, err = dataMatrix(l.Code.Text); err != nil {
			return a, &refusal.Reason{Code: refusal.TextTooLong, Severity: refusal.Refuse, Syringe: l.Number,
				Message: "The barcode of " + l.Name + " cannot be made: " + err.Error() + ".", Field: "barcode",
				Got: l.Code.Text, Want: "a code after the GS1 rules"}
		}
	}
	var why string
	if a.arranged, why = arrange(l, s.panel(ink.Point{}), s, mono, a.modules); why == "" {
		return a, nil
	}
	if !l.Infusion && len(l.Dose) > 0 {
		a.label.Dose = nil
		var still string
		if a.arranged, still = arrange(a.label, s.panel(ink.Point{}), s, mono, a.modules); still == "" {
			return a, &refusal.Reason{Code: refusal.TextTooLong, Severity: refusal.Caution, Syringe: l.Number,
				Message: fmt.Sprintf("The label of %s has no room for the dose; the draw-up sheet has it.", l.Name), Field: "stock",
				Got: s.Name, Want: "a larger stock, if the label must show it"}
		}
		a.label = l
	}
	larger := a.larger(s, mono)
	return a, &refusal.Reason{Code: refusal.LabelTooSmall, Severity: refusal.Refuse, Syringe: l.Number,
		Message: fmt.Sprintf("The label of %s does not fit stock %s: no room for %s.", l.Name, s.Name, why),
		Field:   "stock", Got: s.Name, Want: "a stock that holds every line of the label", Rule: "R15",
		Source: "ISO 26825:2020, 5.4.2 and 5.4.3 for the name", Remedy: larger}
}

// larger names the next larger stock that holds the label.
func (a arranger) larger(than Stock, mono bool) string {
	for _, s := range Stocks() {
		if s.LabelW*s.LabelH <= than.LabelW*than.LabelH {
			continue
		}
		if _, why := arrange(a.label, s.panel(ink.Point{}), s, mono, a.modules); why == "" {
			return "use stock " + s.Name
		}
	}
	return "no larger stock holds it: shorten the words of the label"
}

// missingRunes is every rune of the label that a face it may be set in cannot
// show.
func missingRunes(l labels.Label) []rune {
	var missing []rune
	for _, text := range l.Text() {
		for _, f := range []ink.Face{ink.Bold, ink.CondensedSemiBold, ink.CondensedRegular} {
			for _, r := range Missing(text, f) {
				if !strings.ContainsRune(string(missing), r) {
					missing = append(missing, r)
				}
			}
		}
	}
	return missing
}

// pagesOf puts the labels on pages.
func pagesOf(list []arranger, s Stock, opt Options) []ink.Page {
	var pages []ink.Page
	at, total := 0, 0
	if !s.Roll() {
		at = opt.Skip
	}
	per := s.PerPage()
	total = (at + len(list) + per - 1) / per
	for _, a := range list {
		if at%per == 0 || len(pages) == 0 {
			page := ink.Page{W: s.PageW, H: s.PageH, Bookmark: bookmark(a.label, s, len(pages)+1, total)}
			if !s.Roll() {
				page.Add(s.edgeNote(opt.Foot, len(pages)+1, total)...)
			}
			pages = append(pages, page)
		}
		panel := s.panel(s.Place(at % per))
		page := &pages[len(pages)-1]
		corner := s.Place(at % per)
		for _, mark := range a.arranged.draw() {
			page.Add(moved(mark, corner.X, corner.Y))
		}
		if s.Inset > 0 {
			page.Add(ink.Outlined(panel.x, panel.y, panel.w, panel.h, hairline, ink.Black))
		}
		at++
	}
	return pages
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
