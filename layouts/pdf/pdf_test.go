package pdf_test

import (
	"bytes"
	"errors"
	"fmt"
	"math"
	"strings"
	"testing"
	"time"
	"unicode"

	"drawup/fonts"
	"drawup/layouts/ink"
	"drawup/layouts/pdf"
	"drawup/layouts/pdf/readback"
)

var (
	made   = time.Date(2026, 3, 4, 5, 6, 7, 0, time.FixedZone("", 3600))
	blue   = ink.Colour{R: 20, G: 120, B: 200}
	yellow = ink.Colour{R: 255, G: 230, B: 0}
)

func document(pages ...ink.Page) pdf.Document {
	return pdf.Document{Pages: pages, Title: "Labels <1> & (2) für µ", Subject: "a test", Keywords: "one, two", Creator: "drawup test",
		Language: "en-GB", Made: made}
}

func written(t testing.TB, doc pdf.Document) []byte {
	t.Helper()
	var out bytes.Buffer
	if err := pdf.Write(&out, doc); err != nil {
		t.Fatal(err)
	}
	return out.Bytes()
}

// sample is an invented page with every kind of mark.
func sample() ink.Page {
	page := ink.Page{W: ink.MM(210), H: ink.MM(297), Bookmark: "Sheet é"}
	page.Add(
		ink.Filled(ink.MM(10), ink.MM(10), ink.MM(40), ink.MM(15), yellow),
		ink.Text{X: ink.MM(12), Y: ink.MM(15), Size: 3582, Face: ink.Bold, Colour: ink.Black, String: "Testamine (invented) \\ 1"},
		ink.Text{X: ink.MM(12), Y: ink.MM(20), Size: 3000, Face: ink.CondensedRegular, Colour: blue, String: "5 μg/mL ≥ ½ × 10 – ø"},
		ink.Text{X: ink.MM(100), Y: ink.MM(60), Size: 4000, Face: ink.Regular, Colour: ink.Black, String: "upwards", Rotate: 90},
		ink.Text{X: ink.MM(110), Y: ink.MM(60), Size: 4000, Face: ink.Regular, Colour: ink.Black, String: "along"},
		ink.Text{X: ink.MM(110), Y: ink.MM(70), Size: 4000, Face: ink.Regular, Colour: ink.Black},
		ink.Rect{X: ink.MM(60), Y: ink.MM(10), W: ink.MM(20), H: ink.MM(10), Fill: ink.Use(blue), Stroke: ink.Use(ink.Black), Width: 1000},
		ink.Outlined(ink.MM(90), ink.MM(10), ink.MM(20), ink.MM(10), 1000, yellow),
		ink.Rule(ink.MM(10), ink.MM(100), ink.MM(100), 500),
		ink.Line{X1: ink.MM(10), Y1: ink.MM(110), X2: ink.MM(110), Y2: ink.MM(110), Width: 500, Colour: ink.Black, Dash: true},
		ink.Rule(ink.MM(10), ink.MM(120), ink.MM(100), 500),
		ink.Polygon{Points: []ink.Point{{X: ink.MM(10), Y: ink.MM(150)}, {X: ink.MM(50), Y: ink.MM(150)}, {X: ink.MM(10), Y: ink.MM(190)}}, Fill: blue},
		ink.Symbol{X: ink.MM(150), Y: ink.MM(150), Module: ink.MM(10), Rows: []string{"#.#", ".#.", "##."}, Colour: blue},
	)
	return page
}

func near(a, b, within ink.Micrometre) bool { return a-b <= within && b-a <= within }

// The renderer finds every text where it was put, in its size, face and
// colour.
func TestTextReadBack(t *testing.T) {
	page := sample()
	runs := readback.Open(t, written(t, document(page))).Text(1)
	var texts []ink.Text
	for _, mark := range page.Marks {
		if text, ok := mark.(ink.Text); ok && text.String != "" {
			texts = append(texts, text)
		}
	}
	if len(runs) != len(texts) {
		t.Fatalf("got %d texts %+v, want %d", len(runs), runs, len(texts))
	}
	for i, want := range texts {
		got := runs[i]
		if name := strings.ReplaceAll(want.String, "μ", "µ"); got.Text != name {
			t.Errorf("got %q, want %q", got.Text, name)
		}
		if !near(got.StartX, want.X, 50) || !near(got.StartY, want.Y, 50) {
			t.Errorf("%q: got start %d,%d, want %d,%d", want.String, got.StartX, got.StartY, want.X, want.Y)
		}
		if got.Size < want.Size || got.Size > want.Size+5 {
			t.Errorf("%q: got size %d, want %d to %d", want.String, got.Size, want.Size, want.Size+5)
		}
		if font := "utf8" + strings.ReplaceAll(string(want.Face), "-", ""); got.Font != font {
			t.Errorf("%q: got font %q, want %q", want.String, got.Font, font)
		}
		if got.Colour != want.Colour || got.Upwards != (want.Rotate == 90) {
			t.Errorf("%q: got colour %s, upwards %t", want.String, got.Colour, got.Upwards)
		}
	}
}

// Every letter that a face covers comes back as itself from the file.
func TestEveryLetter(t *testing.T) {
	for _, name := range fonts.Names() {
		page := ink.Page{W: ink.MM(1000), H: ink.MM(1000)}
		var lines []string
		line := ""
		for r := rune(0x21); r <= 0xFFFF; r++ {
			if fonts.Get(name).Covers(r) && r != 'μ' && !unicode.IsSpace(r) {
				line += string(r)
			}
			if len(line) >= 60 || r == 0xFFFF && line != "" {
				lines, line = append(lines, line), ""
			}
		}
		for i, line := range lines {
			page.Add(ink.Text{X: ink.MM(10), Y: ink.MM(20 + 8*int64(i)), Size: 4000, Face: ink.Face(name), Colour: ink.Black, String: line})
		}
		runs := readback.Open(t, written(t, document(page))).Text(1)
		if len(runs) != len(lines) {
			t.Fatalf("%s: got %d lines, want %d", name, len(runs), len(lines))
		}
		for i, want := range lines {
			// The renderer reads a ligature's letters.
			want = strings.NewReplacer("ﬁ", "fi", "ﬂ", "fl").Replace(want)
			if runs[i].Text != want {
				t.Errorf("%s: got %q, want %q", name, runs[i].Text, want)
			}
		}
	}
}

// The box of a text in the renderer agrees with what fonts measures: turned
// text takes the same length up the page as straight text along it.
func TestTextBoxes(t *testing.T) {
	page := ink.Page{W: ink.MM(100), H: ink.MM(100)}
	page.Add(
		ink.Text{X: ink.MM(50), Y: ink.MM(90), Size: 5000, Face: ink.Bold, Colour: ink.Black, String: "HHHHHHHH", Rotate: 90},
		ink.Text{X: ink.MM(5), Y: ink.MM(20), Size: 5000, Face: ink.Bold, Colour: ink.Black, String: "HHHHHHHH"},
	)
	runs := readback.Open(t, written(t, document(page))).Text(1)
	up, along := runs[0], runs[1]
	if !near(up.H, along.W, 20) || !near(up.W, along.H, 20) || !near(up.Y+up.H, ink.MM(90), 600) || !near(up.X+up.W, ink.MM(50), 50) {
		t.Errorf("got turned box %+v, straight box %+v", up, along)
	}
	// H is 698/1000 em high (font's own outline); the renderer widens boxes a
	// little.
	if !near(along.H, 3490, 60) || !near(along.Y+along.H, ink.MM(20), 20) {
		t.Errorf("got capitals %d high with foot at %d, want 3490 and 20000", along.H, along.Y+along.H)
	}
}

func TestAllText(t *testing.T) {
	text := readback.Open(t, written(t, document(sample()))).AllText(1)
	for _, want := range []string{"Testamine (invented) \\ 1", "5 µg/mL ≥ ½ × 10 – ø", "along"} {
		if !strings.Contains(text, want) {
			t.Errorf("got %q, want %q in it", text, want)
		}
	}
}

func TestPageSizes(t *testing.T) {
	file := readback.Open(t, written(t, document(ink.Page{W: 35_000, H: 12_000}, sample(), ink.Page{W: 35_000, H: 12_000})))
	if got := file.Pages(); got != 3 {
		t.Fatalf("got %d pages, want 3", got)
	}
	for i, want := range [][2]ink.Micrometre{{35_000, 12_000}, {210_000, 297_000}, {35_000, 12_000}} {
		w, h := file.Size(i + 1)
		if !near(w, want[0], 5) || !near(h, want[1], 5) {
			t.Errorf("page %d: got %dx%d, want %dx%d", i+1, w, h, want[0], want[1])
		}
	}
}

func TestBookmarks(t *testing.T) {
	file := readback.Open(t, written(t, document(ink.Page{W: 35_000, H: 12_000, Bookmark: "First ≥ 1"}, ink.Page{W: 35_000, H: 12_000}, sample())))
	want := "[{First ≥ 1 1} {Sheet é 3}]"
	if got := fmt.Sprint(file.Bookmarks()); got != want {
		t.Errorf("got %s, want %s", got, want)
	}
}

// Colours and places of marks, sampled from the rendered page.
func TestRendered(t *testing.T) {
	const dpi = 150
	img := readback.Open(t, written(t, document(sample()))).Render(1, dpi)
	for _, c := range []struct {
		what string
		x, y int64 // tenths of a millimetre
		want ink.Colour
	}{
		{"paper", 50, 50, ink.White},
		{"filled rectangle", 450, 120, yellow},
		{"its last tenths", 496, 246, yellow},
		{"beyond its corner", 505, 255, ink.White},
		{"fill of the stroked", 700, 150, blue},
		{"stroke of the stroked", 600, 150, ink.Black},
		{"stroke of the outlined", 900, 150, yellow},
		{"inside of the outlined", 1000, 150, ink.White},
		{"line", 500, 1000, ink.Black},
		{"line after the dashes", 515, 1200, ink.Black},
		{"dash", 105, 1100, ink.Black},
		{"gap", 115, 1100, ink.White},
		{"polygon", 150, 1550, blue},
		{"beyond its long side", 400, 1700, ink.White},
		{"dark module", 1550, 1550, blue},
		{"light module", 1650, 1550, ink.White},
		{"dark module in the middle", 1650, 1650, blue},
		{"dark module at the foot", 1550, 1750, blue},
		{"light module at the foot", 1750, 1750, ink.White},
	} {
		if got := readback.At(img, ink.Tenths(c.x), ink.Tenths(c.y), dpi); got != c.want {
			t.Errorf("%s at %d,%d: got %s, want %s", c.what, c.x, c.y, got, c.want)
		}
	}
}

func TestAbout(t *testing.T) {
	file := readback.Open(t, written(t, document(sample())))
	for entry, want := range map[string]string{
		"Title": "Labels <1> & (2) für µ", "Subject": "a test", "Keywords": "one, two", "Creator": "drawup test",
		"CreationDate": "D:20260304050607", "Author": "",
	} {
		if got := file.About(entry); got != want {
			t.Errorf("%s: got %q, want %q", entry, got, want)
		}
	}
	if !file.NoScaling() {
		t.Error("got a file that lets the viewer scale it, want none")
	}
}

func TestBytes(t *testing.T) {
	got := written(t, document(sample()))
	for _, want := range []string{
		"/PrintScaling /None", "/Lang (en-GB)", "/Version /1.7", "<xmp:CreateDate>2026-03-04T05:06:07+01:00</xmp:CreateDate>",
		"<dc:title><rdf:Alt><rdf:li xml:lang=\"x-default\">Labels &lt;1&gt; &amp; (2) für µ</rdf:li></rdf:Alt></dc:title>",
		"/BaseFont /utf8bold", "/BaseFont /utf8condensedregular",
	} {
		if !bytes.Contains(got, []byte(want)) {
			t.Errorf("got no %q in the file", want)
		}
	}
	if bytes.Contains(got, []byte("utf8condensedsemibold")) {
		t.Error("got a face that no text uses")
	}
	if len(got) > 60_000 {
		t.Errorf("got %d bytes, want subsets of three faces to stay under 60,000", len(got))
	}
}

// The same document gives the same bytes, also with all faces in use, where
// the library keeps them in maps.
func TestSameBytes(t *testing.T) {
	page := sample()
	page.Add(ink.Text{X: 1000, Y: 5000, Size: 3000, Face: ink.CondensedSemiBold, Colour: ink.Black, String: "last face"})
	first := written(t, document(page, page))
	for range 8 {
		if !bytes.Equal(first, written(t, document(page, page))) {
			t.Fatal("got other bytes for the same document")
		}
	}
}

func TestFaults(t *testing.T) {
	page := ink.Page{W: 35_000, H: 12_000}
	text := ink.Text{X: 1000, Y: 5000, Size: 3000, Face: ink.Regular, Colour: ink.Black, String: "a"}
	with := func(change func(*ink.Text)) ink.Text { t := text; change(&t); return t }
	for _, c := range []struct {
		what string
		mark ink.Mark
		want string // type and part of the message
	}{
		{"no glyph", with(func(t *ink.Text) { t.String = "薬" }), "pdf.MissingGlyph page 2: got U+85AC in \"薬\""},
		{"above the basic plane", with(func(t *ink.Text) { t.String = "a\U0001F489" }), "pdf.MissingGlyph page 2: got U+1F489"},
		{"not UTF-8", with(func(t *ink.Text) { t.String = "a\xe9" }), "pdf.MissingGlyph page 2: got U+FFFD"},
		{"line break", with(func(t *ink.Text) { t.String = "a\nb" }), "pdf.MissingGlyph page 2: got U+000A"},
		{"Greek in condensed", with(func(t *ink.Text) { t.String, t.Face = "Ω", ink.CondensedRegular }), "pdf.MissingGlyph page 2: got U+03A9"},
		{"unknown face", with(func(t *ink.Text) { t.Face = "other" }), "pdf.BadMark page 2: text \"a\": got face \"other\""},
		{"no size", with(func(t *ink.Text) { t.Size = 0 }), "pdf.BadMark page 2: text \"a\": got size 0"},
		{"slanting", with(func(t *ink.Text) { t.Rotate = 45 }), "pdf.BadMark page 2: text \"a\": got a turn of 45"},
		{"too far left", with(func(t *ink.Text) { t.X = -1 }), "pdf.OffPage page 2: got text \"a\" from -1,"},
		{"too long", with(func(t *ink.Text) { t.String = strings.Repeat("a", 30) }), "pdf.OffPage"},
		{"too high", with(func(t *ink.Text) { t.Y = 100 }), "pdf.OffPage"},
		{"descender too low", with(func(t *ink.Text) { t.Y, t.String = 12_000, "g" }), "pdf.OffPage"},
		{"turned, too long", with(func(t *ink.Text) { t.Rotate, t.String = 90, "aaaaaaaa" }), "pdf.OffPage"},
		{"no area", ink.Filled(0, 0, 0, 5, ink.Black), "pdf.BadMark page 2: rectangle: got 0x5"},
		{"neither fill nor stroke", ink.Rect{W: 5, H: 5}, "pdf.BadMark page 2: rectangle: got neither"},
		{"no stroke width", ink.Outlined(0, 0, 5, 5, 0, ink.Black), "pdf.BadMark page 2: rectangle: got stroke width 0"},
		{"rectangle over the edge", ink.Filled(0, 0, 35_001, 5, ink.Black), "pdf.OffPage page 2: got rectangle from 0,0 to 35001,5, want within 35000x12000"},
		{"stroke over the edge", ink.Outlined(0, 0, 5000, 5000, 200, ink.Black), "pdf.OffPage"},
		{"no line width", ink.Rule(0, 10, 10, 0), "pdf.BadMark page 2: line: got width 0"},
		{"no length", ink.Rule(0, 10, 0, 10), "pdf.BadMark page 2: line: got two ends"},
		{"line over the edge", ink.Rule(0, 12_000, 100, 100), "pdf.OffPage"},
		{"two points", ink.Polygon{Points: make([]ink.Point, 2)}, "pdf.BadMark page 2: polygon: got 2 points"},
		{"no points", ink.Polygon{}, "pdf.BadMark page 2: polygon: got 0 points"},
		{"polygon over the edge", ink.Polygon{Points: []ink.Point{{X: 0, Y: 0}, {X: 1, Y: 0}, {X: 0, Y: 12_001}}}, "pdf.OffPage"},
		{"no module", ink.Symbol{Rows: []string{"#"}}, "pdf.BadMark page 2: symbol: got module 0"},
		{"no rows", ink.Symbol{Module: 1}, "pdf.BadMark page 2: symbol: got no modules"},
		{"ragged", ink.Symbol{Module: 1, Rows: []string{"##", "#"}}, "pdf.BadMark page 2: symbol: got 1 modules in row 2"},
		{"other byte", ink.Symbol{Module: 1, Rows: []string{"#x"}}, "pdf.BadMark page 2: symbol: got row"},
		{"symbol over the edge", ink.Symbol{Module: 20_000, Rows: []string{"##"}}, "pdf.OffPage"},
		{"module beyond all pages", ink.Symbol{Module: 1 << 62, Rows: []string{"####"}}, "pdf.BadMark page 2: symbol: got module"},
		{"width beyond 64 bits", ink.Filled(1, 0, math.MaxInt64, 1, ink.Black), "pdf.OffPage"},
		{"place beyond 64 bits", ink.Filled(math.MaxInt64, 0, 1, 1, ink.Black), "pdf.OffPage"},
		{"text beyond 64 bits", with(func(t *ink.Text) { t.X = math.MaxInt64 }), "pdf.OffPage"},
		{"no mark", nil, "pdf.BadMark page 2"},
	} {
		bad := ink.Page{W: page.W, H: page.H, Marks: []ink.Mark{c.mark}}
		var out bytes.Buffer
		err := pdf.Write(&out, document(page, bad))
		if err == nil || !strings.HasPrefix(fmt.Sprintf("%T %v", err, err), c.want) {
			t.Errorf("%s: got %T %v, want %s", c.what, err, err, c.want)
		}
		if out.Len() > 0 {
			t.Errorf("%s: got %d bytes before the error, want none", c.what, out.Len())
		}
	}
}

func TestBadDocuments(t *testing.T) {
	page := ink.Page{W: 35_000, H: 12_000}
	for _, c := range []struct {
		field  string
		change func(*pdf.Document)
	}{
		{"pages", func(d *pdf.Document) { d.Pages = nil }},
		{"made", func(d *pdf.Document) { d.Made = time.Time{} }},
		{"language", func(d *pdf.Document) { d.Language = "en)" }},
		{"title", func(d *pdf.Document) { d.Title = "\xff" }},
		{"subject", func(d *pdf.Document) { d.Subject = "\U0001F489" }},
		{"creator", func(d *pdf.Document) { d.Creator = "\n" }},
		{"bookmark", func(d *pdf.Document) { d.Pages = []ink.Page{{W: 1, H: 1, Bookmark: "\xe9"}} }},
		{"page size", func(d *pdf.Document) { d.Pages = []ink.Page{{W: 0, H: 1}} }},
		{"page size", func(d *pdf.Document) { d.Pages = []ink.Page{{W: 1, H: 5_080_001}} }},
	} {
		doc := document(page)
		c.change(&doc)
		err := pdf.Write(&bytes.Buffer{}, doc)
		if bad, ok := errors.AsType[pdf.BadDocument](err); !ok || bad.Field != c.field {
			t.Errorf("got error %v, want one about %s", err, c.field)
		}
	}
}

// broken refuses to take bytes after the first few.
type broken struct{ left int }

var errBroken = errors.New("disk full")

func (b *broken) Write(p []byte) (int, error) {
	n := min(len(p), b.left)
	b.left -= n
	if n < len(p) {
		return n, errBroken
	}
	return n, nil
}

func TestWriterFails(t *testing.T) {
	doc := document(sample())
	for _, left := range []int{0, 1000, len(written(t, doc)) - 1} {
		if err := pdf.Write(&broken{left}, doc); !errors.Is(err, errBroken) {
			t.Errorf("writer that fails after %d bytes: got error %v, want %v", left, err, errBroken)
		}
	}
}
