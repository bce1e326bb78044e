package layouts_test

import (
	"image"
	"strings"
	"testing"

	"drawup/labels"
	"drawup/layouts"
	"drawup/layouts/ink"
	"drawup/layouts/pdf/readback"
)

// doubled shows every pixel twice each way. At 203 dots per inch a module is
// three pixels, at which the reader used here often miscounts the columns; a
// camera sees more than that, and nothing is added.
func doubled(img *image.RGBA) *image.RGBA {
	b := img.Bounds()
	out := image.NewRGBA(image.Rect(0, 0, 2*b.Dx(), 2*b.Dy()))
	for y := range out.Bounds().Dy() {
		for x := range out.Bounds().Dx() {
			out.SetRGBA(x, y, img.RGBAAt(x/2, y/2))
		}
	}
	return out
}

// scanned is what a scanner sends for a human-readable form, by the GS1
// rules: identifiers and values, a separator after each but the last.
func scanned(hri string) string {
	text := strings.ReplaceAll(strings.TrimPrefix(hri, "("), "(", "\x1d")
	return "]d2" + strings.ReplaceAll(text, ")", "")
}

// The barcode of every class reads back at the dots per inch of label and
// office printers, from the printed page, and says the same as the text.
func TestBarcodeReads(t *testing.T) {
	for _, c := range []struct {
		s    layouts.Stock
		list []labels.Label
	}{
		{short(t), samples()}, {stock(t, "a4-24"), samples()[:6]}, {stock(t, "roll-40x15"), samples()[:1]}, {stock(t, "roll-70x37"), samples()[5:6]},
	} {
		page := placed(t, c.list, c.s, layouts.Options{})[0]
		file := printed(t, []ink.Page{page})
		for _, dpi := range []int{203, 300, 600} {
			img, at := file.Render(1, dpi), 0
			for _, mark := range page.Marks {
				m, ok := mark.(ink.Symbol)
				if !ok {
					continue
				}
				around := 2 * m.Module
				side := ink.Micrometre(len(m.Rows))*m.Module + 2*around
				crop := readback.Crop(img, m.X-around, m.Y-around, side, side, dpi)
				if dpi == 203 {
					crop = doubled(crop)
				}
				got, err := readback.DecodeDataMatrix(crop)
				if want := scanned(c.list[at].Code.Text); err != nil || got != want {
					t.Errorf("%s %s at %d: got %q, %v, want %q", c.s.Name, c.list[at].Name, dpi, got, err, want)
				}
				at++
			}
			if at != len(c.list) {
				t.Errorf("%s: got %d symbols for %d labels", c.s.Name, at, len(c.list))
			}
		}
	}
}

// A code that breaks the GS1 rules is refused, not drawn.
func TestBarcodeRefused(t *testing.T) {
	l := samples()[0]
	l.Code.Text = "(21)0001"
	pages, refused := layouts.Labels([]labels.Label{l}, stock(t, "a4-65"), []allPassed{{}}, layouts.Options{})
	if pages != nil || !refused.Refused() {
		t.Errorf("got %d pages, %v, want a refusal", len(pages), refused)
	}
}
