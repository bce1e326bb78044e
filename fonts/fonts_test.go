package fonts_test

import (
	"strings"
	"testing"

	"drawup/fonts"

	"github.com/go-pdf/fpdf"
)

// The second reader of the font tables in these tests is the PDF library's
// own, which shares no code with ours.
func library(t *testing.T, name fonts.Name) *fpdf.Fpdf {
	t.Helper()
	lib := fpdf.New("P", "pt", "A4", "")
	lib.AddUTF8FontFromBytes("face", "", fonts.Get(name).File())
	lib.SetFont("face", "", 10)
	if err := lib.Error(); err != nil {
		t.Fatal(err)
	}
	return lib
}

// Every letter of every face is as wide as a second reading of the file says.
// All faces have 1000 units to the em, so a letter set 1000 hundredths of a
// point high measures its units in hundredths of a point.
func TestWidthsAgainstSecondReading(t *testing.T) {
	for _, name := range fonts.Names() {
		face, lib := fonts.Get(name), library(t, name)
		covered := 0
		for r := rune(0x20); r <= 0xFFFF; r++ {
			if !face.Covers(r) || r == 'μ' {
				continue
			}
			covered++
			units := int64(lib.GetStringSymbolWidth(string(r)))
			// 127,000,000 micrometres are 36,000,000 hundredths of a point.
			if got, want := face.Width(string(r), 127_000_000), units*127_000; got != want {
				t.Errorf("%s %U: got width %d, want %d", name, r, got, want)
			}
		}
		if covered < 500 {
			t.Errorf("%s: got %d letters, want at least 500", name, covered)
		}
	}
}

// The second reader confirms capital height, ascender and descender; the
// outlines of H and x confirm both heights, as they are another table of the
// same file. In all four faces H is 698/1000 em high.
func TestMetrics(t *testing.T) {
	const em = 127_000 // 36,000 hundredths of a point, a whole number
	for _, name := range fonts.Names() {
		face := fonts.Get(name)
		desc := library(t, name).GetFontDesc("face", "")
		if int64(desc.CapHeight) != face.CapHeight(1000) || int64(desc.Ascent) != face.Ascent(1000) || int64(-desc.Descent) != face.Descent(1000) {
			t.Errorf("%s: got %d %d %d, second reading %d %d %d", name, face.CapHeight(1000), face.Ascent(1000), face.Descent(1000),
				desc.CapHeight, desc.Ascent, -desc.Descent)
		}
		if above, _ := face.Extents("H", em); above != face.CapHeight(em) || above != em*698/1000 {
			t.Errorf("%s: got capitals %d, outline of H %d, want %d", name, face.CapHeight(em), above, em*698/1000)
		}
		if above, _ := face.Extents("x", em); above != face.XHeight(em) {
			t.Errorf("%s: got x height %d, outline of x %d", name, face.XHeight(em), above)
		}
	}
}

// The em size for a cap height is the smallest that reaches it: worked by hand
// from capitals of 698/1000 em, 2500/0.698 = 3581.66.
func TestSizeForCapHeight(t *testing.T) {
	face := fonts.Get(fonts.Regular)
	if got := face.SizeForCapHeight(2500); got != 3582 {
		t.Errorf("got %d, want 3582", got)
	}
	for h := int64(1); h < 20_000; h += 7 {
		size := face.SizeForCapHeight(h)
		if face.CapHeight(size) < h || face.CapHeight(size-1) >= h {
			t.Fatalf("height %d: got size %d with capitals %d, want the smallest that reaches it", h, size, face.CapHeight(size))
		}
		size = face.SizeForXHeight(h)
		if face.XHeight(size) < h || face.XHeight(size-1) >= h {
			t.Fatalf("height %d: got size %d with x %d, want the smallest that reaches it", h, size, face.XHeight(size))
		}
	}
}

// One point is 1/72 inch and one inch 25,400 micrometres.
func TestHundredths(t *testing.T) {
	for _, c := range []struct{ size, want int64 }{{25_400, 7200}, {127, 36}, {128, 37}, {1, 1}, {0, 0}} {
		if got := fonts.Hundredths(c.size); got != c.want {
			t.Errorf("%d micrometres: got %d hundredths of a point, want %d", c.size, got, c.want)
		}
	}
}

// Ten digits of 600 units at 12 points are 72 points, one inch, wide.
func TestWidthByHand(t *testing.T) {
	size := int64(25_400 * 12 / 72) // 4233 and a third, printed as 12 points
	face := fonts.Get(fonts.Regular)
	if got := face.Width("0123456789", size); got != 25_400 {
		t.Errorf("got %d, want 25400", got)
	}
	if face.Width("", size) != 0 || face.Width("0", 0) != 0 || face.Width("0", -5) != 0 {
		t.Error("got a width for nothing, want 0")
	}
}

func TestDigitsEquallyWide(t *testing.T) {
	for _, name := range fonts.Names() {
		for _, digit := range "123456789" {
			if got, want := fonts.Get(name).Width(string(digit), 10_000), fonts.Get(name).Width("0", 10_000); got != want {
				t.Errorf("%s %c: got %d, want %d as for 0", name, digit, got, want)
			}
		}
	}
}

func TestMissing(t *testing.T) {
	for _, c := range []struct {
		name fonts.Name
		text string
		want string
	}{
		{fonts.Regular, "Adrenaline 1 mg/mL ≥ ½ × 10 µg μg – é ß Ł ½", ""},
		{fonts.CondensedSemiBold, "μ µ", ""},
		{fonts.Regular, "Ωαβ", ""},
		{fonts.CondensedRegular, "αβα", "αβ"},
		{fonts.Regular, "薬", "薬"},
		{fonts.Regular, "\U0001F489a\U0001F489", "\U0001F489"},
		{fonts.Regular, "e\u0301", "\u0301"},    // combining accent
		{fonts.Regular, "so\u00adft", "\u00ad"}, // soft hyphen
		{fonts.Regular, "a\u202eb\n", "\u202e\n"},
		{fonts.Regular, "\xff", "\ufffd"},
		{fonts.Name("other"), "a", "a"},
	} {
		if got := string(fonts.Get(c.name).Missing(c.text)); got != c.want {
			t.Errorf("%s %q: got missing %q, want %q", c.name, c.text, got, c.want)
		}
	}
}

func TestUnknownFace(t *testing.T) {
	face := fonts.Get("other")
	if face != nil || face.File() != nil || face.Width("a", 1000) != 0 || face.CapHeight(1000) != 0 || face.SizeForCapHeight(1000) != 0 {
		t.Error("got measures of an unknown face, want none")
	}
}

func TestNormalise(t *testing.T) {
	if got := fonts.Normalise("\u03bcg \u00b5g"); got != "\u00b5g \u00b5g" {
		t.Errorf("got %q", got)
	}
	face := fonts.Get(fonts.CondensedRegular)
	if face.Width("\u03bc", 5000) != face.Width("\u00b5", 5000) {
		t.Error("got two widths for the two signs of micro, want one")
	}
}

// Extents is the ink's, not the face's: a capital X is as high as the cap
// height and has no descender; g drops, a blank has neither.
func TestExtents(t *testing.T) {
	face := fonts.Get(fonts.Regular)
	above, below := face.Extents("X", 127_000)
	if above != 88_646 || below != 0 { // 698/1000 of 127,000
		t.Errorf("X: got %d above, %d below, want 88646 and 0", above, below)
	}
	if _, below = face.Extents("Xg", 127_000); below <= 0 || below > face.Descent(127_000) {
		t.Errorf("Xg: got %d below, want some, at most %d", below, face.Descent(127_000))
	}
	if above, below = face.Extents(" ", 127_000); above != 0 || below != 0 {
		t.Errorf("blank: got %d above, %d below, want none", above, below)
	}
}

func TestLicence(t *testing.T) {
	if !strings.Contains(fonts.Licence(), "SIL OPEN FONT LICENSE Version 1.1") {
		t.Error("got no licence text, want the Open Font License")
	}
}
