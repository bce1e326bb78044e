package layouts_test

import (
	"image"
	"slices"
	"strings"
	"testing"

	"drawup/dilution/refusal"
	"drawup/labels"
	"drawup/layouts"
	"drawup/layouts/ink"
	"drawup/layouts/pdf/readback"
)

// scanned is what a scanner sends for a human-readable form, by the GS1
// rules: identifiers and values, a separator after each but the last.
func scanned(hri string) string {
	text := strings.ReplaceAll(strings.TrimPrefix(hri, "("), "(", "\x1d")
	return "]d2" + strings.ReplaceAll(text, ")", "")
}

// formOf is which of its forms a label's symbol holds, -1 for none of them.
func formOf(l labels.Label, read string) int {
	return slices.IndexFunc(l.Codes, func(c labels.Cell) bool { return scanned(c.Text) == read })
}

// crops are the symbols of a rendered page, cut within their white panels: the
// quiet zone of one module, less a dot.
func crops(page ink.Page, img *image.RGBA, dpi int) (out []*image.RGBA, modules []ink.Micrometre) {
	for _, mark := range page.Marks {
		m, ok := mark.(ink.Symbol)
		if !ok {
			continue
		}
		around := m.Module - 25400/ink.Micrometre(dpi)
		side := ink.Micrometre(len(m.Rows))*m.Module + 2*around
		crop := readback.Crop(img, m.X-around, m.Y-around, side, side, dpi)
		if dpi < 600 {
			crop = readback.Doubled(crop)
		}
		out, modules = append(out, readback.Framed(crop, 20)), append(modules, m.Module)
	}
	return out, modules
}

// codedStocks is labels of all classes on every stock, as many as a page holds.
func codedStocks(t *testing.T) []struct {
	s    layouts.Stock
	list []labels.Label
} {
	return []struct {
		s    layouts.Stock
		list []labels.Label
	}{
		{short(t), samples()}, {stock(t, "a4-24"), samples()[:6]}, {stock(t, "roll-40x15"), samples()[:1]}, {stock(t, "roll-70x37"), samples()[5:6]},
	}
}

// The barcode of every class reads back at the dots per inch of label and
// office printers, from the printed page, and says the same as the text. A
// module is a whole number of the printer's dots and never under the 0.255 mm of
// GS1 DataMatrix on healthcare items [unverified: the table was not seen].
func TestBarcodeReads(t *testing.T) {
	for _, c := range codedStocks(t) {
		page := placed(t, c.list, c.s, layouts.Options{})[0]
		file := printed(t, []ink.Page{page})
		for _, dpi := range []int{203, 300, 600} {
			symbols, modules := crops(page, file.Render(1, dpi), dpi)
			if len(symbols) != len(c.list) {
				t.Errorf("%s: got %d symbols for %d labels", c.s.Name, len(symbols), len(c.list))
			}
			for i, crop := range symbols {
				got, err := readback.DecodeDataMatrix(crop)
				if err != nil { // the soft edges of a camera, at 2.4 dots a module
					got, err = readback.DecodeDataMatrix(readback.Blurred(crop, 1))
				}
				if err != nil || formOf(c.list[i], got) < 0 {
					t.Errorf("%s %s at %d: got %q, %v, want one of %v", c.s.Name, c.list[i].Name, dpi, got, err, c.list[i].Codes)
				}
				dots := (int(modules[i])*c.s.DPI + 12700) / 25400
				if off := int(modules[i])*c.s.DPI - dots*25400; modules[i] < 255 || off > c.s.DPI || off < -c.s.DPI {
					t.Errorf("%s %s: got a module of %d micrometres, want whole dots of %d per inch and 255 at least", c.s.Name, c.list[i].Name, modules[i], c.s.DPI)
				}
			}
		}
	}
}

// What a scanner meets on the ward: a label a little out of focus, and held two
// or three degrees askew either way. Soft edges are a blur of one dot, seen out
// of focus one of two or three.
func TestBarcodeReadsBlurredAndAskew(t *testing.T) {
	for _, c := range codedStocks(t) {
		page := placed(t, c.list, c.s, layouts.Options{})[0]
		file := printed(t, []ink.Page{page})
		for dpi, blur := range map[int]int{203: 1, 300: 2, 600: 3} {
			symbols, _ := crops(page, file.Render(1, dpi), dpi)
			for i, crop := range symbols {
				soft := readback.Blurred(crop, 1)
				for name, picture := range map[string]image.Image{
					"out of focus": readback.Blurred(crop, blur), "2 degrees": readback.Turned(soft, 2), "3 degrees": readback.Turned(soft, 3),
					"-2 degrees": readback.Turned(soft, -2), "-3 degrees": readback.Turned(soft, -3),
				} {
					if got, err := readback.DecodeDataMatrix(picture); err != nil || formOf(c.list[i], got) < 0 {
						t.Errorf("%s %s at %d, %s: got %q, %v", c.s.Name, c.list[i].Name, dpi, name, got, err)
					}
				}
			}
		}
	}
}

// The full form stands on every stock but the roll of 40 by 15 mm, which holds
// symbols of 22 by 22 modules at most: there stands the short one. A full form
// costs neither a label its place nor the name its size: where it would, the
// short one stands.
func TestCodeForms(t *testing.T) {
	for _, c := range []struct {
		stock string
		want  []int // sides
	}{
		{"roll-40x15", []int{22}}, {"a4-65", []int{22, 26}}, {"a4-24", []int{26, 32}}, {"roll-70x37", []int{26, 32}},
	} {
		s, full := stock(t, c.stock), 0
		for _, l := range samples() {
			pages, refused := layouts.Labels([]labels.Label{l}, s, []allPassed{{}}, layouts.Options{})
			if refused.Refused() && c.stock == "roll-40x15" && strings.HasSuffix(l.Class.Code, "-A") {
				continue // too small for these class words
			}
			side := 0
			for _, mark := range pages[0].Marks {
				if m, ok := mark.(ink.Symbol); ok {
					side = len(m.Rows)
				}
			}
			if !slices.Contains(c.want, side) {
				t.Errorf("%s %s: got a symbol of %d modules, want one of %v", c.stock, l.Name, side, c.want)
			}
			if side > 22 {
				full++
			}
			alone := l
			alone.Codes = l.Codes[1:]
			if got, want := nameSize(pages, l), nameSize(placed(t, []labels.Label{alone}, s, layouts.Options{}), l); got != want || got == 0 {
				t.Errorf("%s %s: got a name of %d with the full form, want the %d of the short one", c.stock, l.Name, got, want)
			}
		}
		t.Logf("%s: full form on %d of %d labels", c.stock, full, len(samples()))
		if least := map[string]int{"roll-40x15": 0, "a4-65": 12, "a4-24": 17, "roll-70x37": 17}[c.stock]; full < least || least == 0 && full > 0 {
			t.Errorf("%s: got the full form on %d labels, want %d", c.stock, full, least)
		}
	}
}

// The forms with a number of the site's own: on the roll of 40 by 15 mm number,
// use-by and serial; on the sheet of 65 the reference as well; on larger labels
// all that the internal form says besides. 952 is the GS1 prefix for
// demonstrations and examples.
func TestProductForms(t *testing.T) {
	l := sample("VAS", "Ephedrine", "3 mg/mL", "30 mg", "C01CA26", "3mg/mL")
	const number, expiry, serial = "(01)09521234000006", "(7003)2612011930", "(21)00001003"
	l.Codes = []labels.Cell{
		{Text: number + expiry + "(10)70836235" + serial + "(91)C01CA26(93)3mg/mL(94)30mg(95)7a83c0d1", Figure: "code.1.text"},
		{Text: number + expiry + "(10)70836235" + serial, Figure: "code.2.text"}, {Text: number + expiry + serial, Figure: "code.3.text"},
	}
	scan := "]d201095212340000067003" + "2612011930\x1d"
	for name, want := range map[string]string{
		"roll-40x15": scan + "2100001003", "a4-65": scan + "1070836235\x1d2100001003",
		"a4-24":      scan + "1070836235\x1d2100001003\x1d91C01CA26\x1d933mg/mL\x1d9430mg\x1d957a83c0d1",
		"roll-70x37": scan + "1070836235\x1d2100001003\x1d91C01CA26\x1d933mg/mL\x1d9430mg\x1d957a83c0d1",
	} {
		page := placed(t, []labels.Label{l}, stock(t, name), layouts.Options{})[0]
		symbols, _ := crops(page, printed(t, []ink.Page{page}).Render(1, 300), 300)
		if got, err := readback.DecodeDataMatrix(symbols[0]); err != nil || got != want {
			t.Errorf("%s: got %q, %v, want %q", name, got, err, want)
		}
	}
}

// nameSize is the em size of the name; 0 when it is not there.
func nameSize(pages []ink.Page, l labels.Label) ink.Micrometre {
	for _, mark := range pages[0].Marks {
		if m, ok := mark.(ink.Text); ok && m.String == l.Name {
			return m.Size
		}
	}
	return 0
}

// A stock whose modules would be under 0.255 mm, or under two dots, gets no code
// that nobody can read: its labels are refused.
func TestModuleTooSmall(t *testing.T) {
	s := stock(t, "roll-70x37")
	for _, c := range []struct {
		dpi  int
		dots []int
	}{{203, []int{1, 2}}, {300, []int{3, 2}}, {72, []int{1}}} {
		s.DPI, s.Dots = c.dpi, c.dots
		if got := refusedWith(t, samples()[0], s); got.Code != refusal.LabelTooSmall || !strings.Contains(got.Message, "barcode") {
			t.Errorf("%d dots per inch, modules of %v: got %v", c.dpi, c.dots, got)
		}
	}
	s.DPI, s.Dots = 203, []int{3}
	placed(t, samples()[:1], s, layouts.Options{})
}

// A code that breaks the GS1 rules is refused, not drawn, in whichever form.
func TestBarcodeRefused(t *testing.T) {
	for i := range 2 {
		l := samples()[0]
		l.Codes[i].Text = "(21)0001"
		pages, refused := layouts.Labels([]labels.Label{l}, stock(t, "a4-65"), []allPassed{{}}, layouts.Options{})
		if pages != nil || !refused.Refused() {
			t.Errorf("got %d pages, %v, want a refusal", len(pages), refused)
		}
	}
}
