package layouts_test

import (
	"bytes"
	"fmt"
	"runtime"
	"runtime/metrics"
	"strings"
	"testing"
	"time"

	"drawup/fonts"
	"drawup/labels"
	"drawup/labels/gs1"
	"drawup/layouts"
	"drawup/layouts/pdf"

	"github.com/boombuler/barcode/datamatrix"
	"github.com/go-pdf/fpdf"
)

// batch is n labels of one drug, different in number, serial and code.
func batch(n int) []labels.Label {
	list := make([]labels.Label, n)
	for i := range list {
		l := samples()[0]
		l.Number, l.Serial.Text = i+1, fmt.Sprintf("%08d", i+1)
		l.Codes = numbered(l)
		list[i] = l
	}
	return list
}

// numbered is the codes of a sample with the label's own serial.
func numbered(l labels.Label) []labels.Cell {
	var out []labels.Cell
	for _, code := range l.Codes {
		code.Text = strings.Replace(code.Text, "00001003", l.Serial.Text, 1)
		out = append(out, code)
	}
	return out
}

// mixed is n labels of all classes of which no two have the same words: their
// figures differ.
func mixed(n int) []labels.Label {
	kinds := samples()
	list := make([]labels.Label, n)
	for i := range list {
		l := kinds[i%len(kinds)]
		l.Number, l.Serial.Text = i+1, fmt.Sprintf("%08d", i+1)
		l.Amount = append(labels.Line{}, l.Amount...)
		l.Amount[0].Text = fmt.Sprintf("%d mg", i+1)
		l.Prepared = append(labels.Line{}, l.Prepared...)
		l.Prepared[1].Text = fmt.Sprintf("%02d Dec 2026 07:%02d", 1+i%28, i/28%60)
		l.Codes = numbered(l)
		list[i] = l
	}
	return list
}

// unlike is n labels whose letters differ too, so that each is arranged from
// the beginning.
func unlike(n int) []labels.Label {
	list := mixed(n)
	for i := range list {
		name := " A. "
		for k := i; ; k /= 20 {
			name += string(rune('a' + k%20))
			if k < 20 {
				break
			}
		}
		list[i].Prepared[2].Text = name
	}
	return list
}

var made = time.Date(2026, 12, 1, 7, 30, 0, 0, time.UTC)

// ours places labels and writes the file.
func ours(tb testing.TB, list []labels.Label) int {
	pages, refused := layouts.Labels(list, stock(tb, "a4-65"), make([]allPassed, len(list)), layouts.Options{})
	if refused.Refused() {
		tb.Fatal(refused)
	}
	var out bytes.Buffer
	if err := pdf.Write(&out, pdf.Document{Pages: pages, Title: "labels", Creator: "drawup", Language: "en-GB", Made: made}); err != nil {
		tb.Fatal(err)
	}
	return out.Len()
}

// inParts does the same in several files, none of them kept.
func inParts(tb testing.TB, list []labels.Label) int {
	size := 0
	for _, part := range layouts.Parts(list, stock(tb, "a4-65"), 0, layouts.PartSize) {
		size += ours(tb, part)
	}
	return size
}

// plain is the same job done the plain way, the library called directly: the
// same words, fill and code, a rectangle for each dark module, and no thought
// about where anything fits.
func plain(tb testing.TB, list []labels.Label) int {
	lib := fpdf.New("P", "mm", "A4", "")
	lib.SetCreationDate(made)
	lib.SetAutoPageBreak(false, 0)
	for _, f := range []fonts.Name{fonts.Bold, fonts.CondensedSemiBold, fonts.CondensedRegular} {
		lib.AddUTF8FontFromBytes(string(f), "", fonts.Get(f).File())
	}
	for i, l := range list {
		if i%65 == 0 {
			lib.AddPage()
		}
		x, y := 5.7+40.6*float64(i%5), 11.7+21.2*float64(i%65/5)
		c := l.Class.Background()
		lib.SetFillColor(int(c.R), int(c.G), int(c.B))
		lib.Rect(x, y, 36.1, 19.2, "F")
		if l.Class.Stripes {
			lib.SetFillColor(int(l.Class.Fill.R), int(l.Class.Fill.G), int(l.Class.Fill.B))
			for k := range 20 {
				at := x + float64(k)*1.8
				lib.Polygon([]fpdf.PointType{{X: at, Y: y + 4}, {X: at + 1, Y: y + 4}, {X: at + 2, Y: y}, {X: at + 1, Y: y}}, "F")
			}
		}
		for row, text := range []string{l.Name, l.Concentration.Text, l.Amount.Text(), l.UseBy.Text(), l.Prepared.Text(), l.Class.Word, l.Serial.Text} {
			face, size := fonts.CondensedRegular, 5.0
			switch row {
			case 0:
				face, size = fonts.Bold, 15
			case 1:
				face, size = fonts.Bold, 8
			case 3, 5:
				face = fonts.CondensedSemiBold
			}
			lib.SetFont(string(face), "", size)
			lib.Text(x+1, y+6+1.9*float64(row), text)
		}
		plainCode(tb, lib, l.Codes[0].Text, x+27, y+10)
		lib.Rect(x, y, 36.1, 19.2, "D")
	}
	var out bytes.Buffer
	if err := lib.Output(&out); err != nil {
		tb.Fatal(err)
	}
	return out.Len()
}

func plainCode(tb testing.TB, lib *fpdf.Fpdf, hri string, x, y float64) {
	elements, err := gs1.Parse(hri)
	if err != nil {
		tb.Fatal(err)
	}
	symbol, _, err := gs1.Encode(elements)
	if err != nil {
		tb.Fatal(err)
	}
	code, err := datamatrix.Encode(string(symbol))
	if err != nil {
		tb.Fatal(err)
	}
	lib.SetFillColor(255, 255, 255)
	lib.Rect(x, y, 8.3, 8.3, "F")
	lib.SetFillColor(0, 0, 0)
	for j := range code.Bounds().Dy() {
		for i := range code.Bounds().Dx() {
			if r, _, _, _ := code.At(i, j).RGBA(); r == 0 {
				lib.Rect(x+0.296*float64(i+1), y+0.296*float64(j+1), 0.296, 0.296, "F")
			}
		}
	}
}

// measure reports labels a second, bytes and allocations a label, and by how
// much the heap grew at most.
func measure(b *testing.B, list []labels.Label, job func(testing.TB, []labels.Label) int) {
	size := 0
	runtime.GC()
	stop := make(chan struct{})
	peak := make(chan uint64)
	sample := []metrics.Sample{{Name: "/memory/classes/heap/objects:bytes"}}
	metrics.Read(sample)
	start := sample[0].Value.Uint64()
	go func() {
		most := start
		for {
			select {
			case <-stop:
				peak <- most
				return
			case <-time.After(time.Millisecond):
				metrics.Read(sample)
				most = max(most, sample[0].Value.Uint64())
			}
		}
	}()
	var before, after runtime.MemStats
	runtime.ReadMemStats(&before)
	for b.Loop() {
		size = job(b, list)
	}
	runtime.ReadMemStats(&after)
	close(stop)
	n := float64(len(list) * b.N)
	b.ReportMetric(n/b.Elapsed().Seconds(), "labels/s")
	b.ReportMetric(float64(size)/float64(len(list)), "bytes/label")
	b.ReportMetric(float64(after.Mallocs-before.Mallocs)/n, "allocs/label")
	b.ReportMetric(float64(<-peak-start)/1e6, "peak-MB")
	b.ReportMetric(0, "ns/op")
}

func BenchmarkLabels1(b *testing.B) { measure(b, mixed(1), ours) }

func BenchmarkLabels1000(b *testing.B) {
	b.Run("batch", func(b *testing.B) { measure(b, batch(1000), ours) })
	b.Run("mixed", func(b *testing.B) { measure(b, mixed(1000), ours) })
	b.Run("unlike", func(b *testing.B) { measure(b, unlike(1000), ours) })
}

func BenchmarkLabels10000(b *testing.B) {
	b.Run("batch", func(b *testing.B) { measure(b, batch(10_000), ours) })
	b.Run("mixed", func(b *testing.B) { measure(b, mixed(10_000), ours) })
	b.Run("unlike", func(b *testing.B) { measure(b, unlike(10_000), ours) })
	b.Run("batch-parts", func(b *testing.B) { measure(b, batch(10_000), inParts) })
	b.Run("mixed-parts", func(b *testing.B) { measure(b, mixed(10_000), inParts) })
}

func BenchmarkPlain1000(b *testing.B) {
	b.Run("batch", func(b *testing.B) { measure(b, batch(1000), plain) })
	b.Run("mixed", func(b *testing.B) { measure(b, mixed(1000), plain) })
}

func BenchmarkPlain10000(b *testing.B) {
	b.Run("batch", func(b *testing.B) { measure(b, batch(10_000), plain) })
	b.Run("mixed", func(b *testing.B) { measure(b, mixed(10_000), plain) })
}

// The benchmarks measure labels that differ as they say.
func TestBenchmarkLists(t *testing.T) {
	s := short(t)
	if n := len(placed(t, mixed(34), s, layouts.Options{})); n != 2 {
		t.Errorf("got %d pages, want 2", n)
	}
	seen := map[string]bool{}
	for _, l := range mixed(2000) {
		seen[l.Name+l.Amount.Text()+l.Prepared.Text()] = true
	}
	for _, l := range unlike(2000) {
		seen[strings.TrimLeft(l.Prepared[2].Text, " A.")] = true
	}
	if len(seen) != 4000 {
		t.Errorf("got %d different labels of 4000", len(seen))
	}
}
