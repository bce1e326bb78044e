// Package layouts says where things go on paper: stocks of blank labels,
// fitting of text, labels and sheets as pages of ink. It takes only what the
// second route has passed.
//
// All lengths are whole micrometres.
package layouts

import "drawup/layouts/ink"

// A Stock is a sheet or roll of blank labels.
type Stock struct {
	Name         string
	PageW, PageH ink.Micrometre
	// Columns and Rows of labels on the page; 1 and 1 on a roll, where every
	// label is a page.
	Columns, Rows  int
	Left, Top      ink.Micrometre // of the first label
	PitchX, PitchY ink.Micrometre // from one label to the next
	LabelW, LabelH ink.Micrometre
	// Inset is how far inside the label's edge everything stays, colour
	// included: what a sheet drifts in the printer must not reach the
	// neighbour, and most sheet printers leave 4.2 mm at the edge of the page
	// blank (a sixth of an inch; common practice).
	Inset ink.Micrometre
	// DPI is the printer's resolution, and Dots the sizes of a barcode module
	// in whole dots, the best first.
	DPI  int
	Dots []int
	// Note is what the user of this stock should know; printed on the sheet.
	Note string
	// NoMargin is set where the page has no margin for the sheet's own words:
	// the last label of each page holds them.
	NoMargin bool
}

// Stocks lists all stocks, the smallest label first.
//
// The measures of the two sheets are those generally given for 65 and 24
// labels on A4. Resolutions are common practice: 600 dots per inch for a
// sheet printer, 300 for a roll printer. Module sizes lie between the 0.255 mm
// and 0.990 mm of GS1 DataMatrix on healthcare items, as near to its target
// of 0.380 mm as the label allows [unverified: the table was not seen].
func Stocks() []Stock {
	return []Stock{
		{Name: "roll-40x15", PageW: ink.MM(40), PageH: ink.MM(15), Columns: 1, Rows: 1,
			LabelW: ink.MM(40), LabelH: ink.MM(15), DPI: 300, Dots: []int{4}},
		{Name: "a4-65", PageW: ink.MM(210), PageH: ink.MM(297), Columns: 5, Rows: 13,
			Left: 4700, Top: 10700, PitchX: 40600, PitchY: 21200, LabelW: 38100, LabelH: 21200,
			Inset: ink.MM(1), DPI: 600, Dots: []int{9, 8, 7},
			Note: "labels 21.2 mm wide; ISO 26825:2020, 5.3 asks for 10 to 15 mm"},
		{Name: "a4-24", PageW: ink.MM(210), PageH: ink.MM(297), Columns: 3, Rows: 8,
			Left: 0, Top: 500, PitchX: 70000, PitchY: 37000, LabelW: 70000, LabelH: 37000,
			Inset: 4200, DPI: 600, Dots: []int{9, 8}, NoMargin: true,
			Note: "larger than ISO 26825:2020, 5.3 gives for syringes"},
		{Name: "roll-70x37", PageW: ink.MM(70), PageH: ink.MM(37), Columns: 1, Rows: 1,
			LabelW: ink.MM(70), LabelH: ink.MM(37), DPI: 300, Dots: []int{4},
			Note: "larger than ISO 26825:2020, 5.3 gives for syringes"},
	}
}

// StockNamed finds a stock by its name.
func StockNamed(name string) (Stock, bool) {
	for _, s := range Stocks() {
		if s.Name == name {
			return s, true
		}
	}
	return Stock{}, false
}

// Roll says whether every label is a page of its own.
func (s Stock) Roll() bool { return s.Columns*s.Rows == 1 }

// PerPage is the number of labels that a full page takes.
func (s Stock) PerPage() int {
	n := s.Columns * s.Rows
	if s.NoMargin {
		n--
	}
	return n
}

// Place is the top left corner of label n on its page, counted from 0 along
// the rows.
func (s Stock) Place(n int) ink.Point {
	return ink.Point{
		X: s.Left + ink.Micrometre(n%s.Columns)*s.PitchX,
		Y: s.Top + ink.Micrometre(n/s.Columns)*s.PitchY,
	}
}

// module is the side of a barcode module of so many printer dots, to the
// nearest micrometre.
func (s Stock) module(dots int) ink.Micrometre {
	return ink.Micrometre((2*dots*25400 + s.DPI) / (2 * s.DPI))
}

// panel is the part of a label at p that carries colour and type.
func (s Stock) panel(p ink.Point) box {
	return box{p.X + s.Inset, p.Y + s.Inset, s.LabelW - 2*s.Inset, s.LabelH - 2*s.Inset}
}

// A box is a rectangle with sides along the page.
type box struct{ x, y, w, h ink.Micrometre }

func (b box) right() ink.Micrometre  { return b.x + b.w }
func (b box) bottom() ink.Micrometre { return b.y + b.h }

// grown is the box with a margin of m on all sides.
func (b box) grown(m ink.Micrometre) box { return box{b.x - m, b.y - m, b.w + 2*m, b.h + 2*m} }

// meets says whether two boxes share more than an edge.
func (b box) meets(o box) bool {
	return b.x < o.right() && o.x < b.right() && b.y < o.bottom() && o.y < b.bottom()
}

func (b box) filled(c ink.Colour) ink.Rect { return ink.Filled(b.x, b.y, b.w, b.h, c) }
