package layouts_test

import (
	"testing"

	"drawup/layouts"
	"drawup/layouts/ink"
)

// The measures are those generally given for the two sheets: 65 labels of
// 38.1 by 21.2 mm, 5 by 13, and 24 of 70 by 37 mm, 3 by 8, on A4 (ISO 216:
// 210 by 297 mm). Sums of margins, labels and gaps must come out at the page,
// to 0.2 mm; that is how the two margins not given anywhere were worked out.
func TestSheetsAddUp(t *testing.T) {
	for _, c := range []struct {
		name  string
		count int
	}{{"a4-65", 65}, {"a4-24", 24}} {
		s, ok := layouts.StockNamed(c.name)
		if !ok || s.Columns*s.Rows != c.count || s.PageW != ink.MM(210) || s.PageH != ink.MM(297) {
			t.Errorf("%s: got %d labels on %d x %d", c.name, s.Columns*s.Rows, s.PageW, s.PageH)
		}
		last := s.Place(c.count - 1)
		right, foot := s.PageW-last.X-s.LabelW, s.PageH-last.Y-s.LabelH
		if d := right - s.Left; d < -200 || d > 200 {
			t.Errorf("%s: got margins %d and %d left and right", c.name, s.Left, right)
		}
		if d := foot - s.Top; d < -200 || d > 200 {
			t.Errorf("%s: got margins %d and %d above and below", c.name, s.Top, foot)
		}
		if s.PitchX < s.LabelW || s.PitchY < s.LabelH {
			t.Errorf("%s: labels overlap", c.name)
		}
	}
}

// GS1 DataMatrix on healthcare items: a module of 0.255 to 0.990 mm (General
// Specifications, from memory of their table); here also a whole number of
// dots of the stock's printer.
func TestModules(t *testing.T) {
	for _, s := range layouts.Stocks() {
		if len(s.Dots) == 0 {
			t.Errorf("%s: no module size", s.Name)
		}
		for _, dots := range s.Dots {
			if module := float64(dots) * 25.4 / float64(s.DPI); module < 0.255 || module > 0.990 {
				t.Errorf("%s: %d dots at %d make %.3f mm", s.Name, dots, s.DPI, module)
			}
		}
	}
}

func TestStocksBySize(t *testing.T) {
	list := layouts.Stocks()
	for i := 1; i < len(list); i++ {
		if list[i].LabelW*list[i].LabelH < list[i-1].LabelW*list[i-1].LabelH {
			t.Errorf("%s stands after the larger %s", list[i].Name, list[i-1].Name)
		}
	}
	if s, ok := layouts.StockNamed("no such"); ok {
		t.Errorf("got %v", s)
	}
}
