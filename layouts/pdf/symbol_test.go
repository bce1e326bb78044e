package pdf_test

import (
	"bytes"
	"fmt"
	"io"
	"strings"
	"testing"

	"drawup/layouts/ink"
	"drawup/layouts/pdf"
	"drawup/layouts/pdf/readback"

	"github.com/boombuler/barcode/datamatrix"
)

// encode makes a GS1 DataMatrix with a public library; a leading byte 0xE8 is
// its FNC1.
func encode(t testing.TB, content string) []string {
	t.Helper()
	code, err := datamatrix.Encode("\xe8" + content)
	if err != nil {
		t.Fatal(err)
	}
	var rows []string
	for y := range code.Bounds().Dy() {
		var row strings.Builder
		for x := range code.Bounds().Dx() {
			if r, _, _, _ := code.At(x, y).RGBA(); r == 0 {
				row.WriteByte(ink.Dark)
			} else {
				row.WriteByte(ink.Light)
			}
		}
		rows = append(rows, row.String())
	}
	return rows
}

// A symbol reads back at the dots per inch of usual label and office printers.
// The module is the 0.380 mm that the GS1 General Specifications give as target for
// healthcare items, from memory of their table.
func TestSymbolDecodes(t *testing.T) {
	rows := encode(t, "91TEST1\xe892ABC")
	const module = 380
	page := ink.Page{W: ink.MM(35), H: ink.MM(12)}
	page.Add(ink.Symbol{X: 2 * module, Y: 2 * module, Module: module, Rows: rows, Colour: ink.Black})
	file := readback.Open(t, written(t, document(page)))
	for _, dpi := range []int{203, 300, 600} {
		side := ink.Micrometre(len(rows)+4) * module
		got, err := readback.DecodeDataMatrix(readback.Crop(file.Render(1, dpi), 0, 0, side, side, dpi))
		if want := "]d291TEST1\x1d92ABC"; err != nil || got != want {
			t.Errorf("%d dpi: got %q, error %v, want %q", dpi, got, err, want)
		}
	}
}

// labels is an invented job: 65 labels a page, each with a coloured band, six
// strings and a symbol of its own, drawn by the given function.
func labels(b *testing.B, count int, symbol func(page *ink.Page, x, y ink.Micrometre, rows []string)) pdf.Document {
	var pages []ink.Page
	for i := range count {
		if i%65 == 0 {
			pages = append(pages, ink.Page{W: ink.MM(210), H: ink.MM(297)})
		}
		page := &pages[len(pages)-1]
		x, y := ink.Micrometre(i%5)*38_100+5000, ink.Micrometre(i%65/5)*21_200+10_000
		page.Add(ink.Filled(x, y, 38_000, 5000, yellow))
		for line := range 6 {
			page.Add(ink.Text{X: x + 1000, Y: y + 3000 + ink.Micrometre(line)*2500, Size: 2500, Face: ink.CondensedRegular,
				Colour: ink.Black, String: fmt.Sprintf("label %d line %d", i, line)})
		}
		symbol(page, x+26_000, y+6000, encode(b, fmt.Sprintf("91%040d", 7_654_321*i)))
	}
	return document(pages...)
}

func asPath(page *ink.Page, x, y ink.Micrometre, rows []string) {
	page.Add(ink.Symbol{X: x, Y: y, Module: 396, Rows: rows, Colour: ink.Black})
}

// asRectangles is the plain way, for comparison only.
func asRectangles(page *ink.Page, x, y ink.Micrometre, rows []string) {
	for j, row := range rows {
		for i := range row {
			if row[i] == ink.Dark {
				page.Add(ink.Filled(x+ink.Micrometre(i)*396, y+ink.Micrometre(j)*396, 396, 396, ink.Black))
			}
		}
	}
}

func benchmark(b *testing.B, symbol func(*ink.Page, ink.Micrometre, ink.Micrometre, []string)) {
	const count = 1950
	doc := labels(b, count, symbol)
	var out bytes.Buffer
	if err := pdf.Write(&out, doc); err != nil {
		b.Fatal(err)
	}
	b.ReportAllocs()
	for b.Loop() {
		if err := pdf.Write(io.Discard, doc); err != nil {
			b.Fatal(err)
		}
	}
	b.ReportMetric(float64(count*b.N)/b.Elapsed().Seconds(), "labels/s")
	b.ReportMetric(float64(out.Len())/count, "bytes/label")
}

func BenchmarkSymbolPath(b *testing.B)       { benchmark(b, asPath) }
func BenchmarkSymbolRectangles(b *testing.B) { benchmark(b, asRectangles) }

// BenchmarkOneLabel is what a person waits for: one label with a text in each
// of the four faces, the time of which is nearly all the library's font work.
func BenchmarkOneLabel(b *testing.B) {
	page := ink.Page{W: ink.MM(35), H: ink.MM(12)}
	for i, face := range []ink.Face{ink.Regular, ink.Bold, ink.CondensedRegular, ink.CondensedSemiBold} {
		page.Add(ink.Text{X: 1000, Y: ink.MM(3 + 2*int64(i)), Size: 2500, Face: face, Colour: ink.Black, String: "Testamine 1 mg/mL"})
	}
	doc := document(page)
	for b.Loop() {
		if err := pdf.Write(io.Discard, doc); err != nil {
			b.Fatal(err)
		}
	}
}
