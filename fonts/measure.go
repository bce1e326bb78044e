package fonts

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// Face is one parsed type face. It never changes and may be shared. The
// methods of a nil Face answer that nothing is covered and nothing has a size.
type Face struct {
	file       []byte
	unitsPerEm int64
	ascent     int64 // hhea.ascender
	descent    int64 // hhea.descender, turned positive
	capHeight  int64 // OS/2.sCapHeight
	xHeight    int64 // OS/2.sxHeight
	glyphs     map[rune]glyph
	notdef     glyph
}

// glyph is what measuring needs of one letter, in font units.
type glyph struct {
	advance    int64
	yMin, yMax int64 // of the outline; both zero for a blank
}

// File returns the TrueType file. The caller must not change it.
func (f *Face) File() []byte {
	if f == nil {
		return nil
	}
	return f.file
}

// Covers reports whether the face can show r by itself. Besides runes without
// a glyph it turns down those above U+FFFF, control and format characters
// (soft hyphen, direction marks), combining marks, which nothing here would
// place over their letter, and U+FFFD, which only ever stands for a fault.
// U+03BC is covered because Normalise turns it into U+00B5.
func (f *Face) Covers(r rune) bool {
	if f == nil {
		return false
	}
	_, ok := f.glyphs[normal(r)]
	return ok
}

// drawable reports whether a rune stands for itself on paper; see Covers.
func drawable(r rune) bool {
	return r <= 0xFFFF && r != utf8.RuneError && !unicode.In(r, unicode.C, unicode.M, unicode.Zl, unicode.Zp)
}

// Missing returns the runes of s that the face does not cover, each once, in
// the order in which they occur; nil if none is missing. Bytes that are not
// UTF-8 count as U+FFFD.
func (f *Face) Missing(s string) []rune {
	var missing []rune
	for _, r := range s {
		if !f.Covers(r) && !strings.ContainsRune(string(missing), r) {
			missing = append(missing, r)
		}
	}
	return missing
}

// Normalise replaces U+03BC (Greek mu) by U+00B5 (micro sign), the only one
// of the two that every embedded face has. Drawing and measuring use it.
func Normalise(s string) string {
	return strings.ReplaceAll(s, "\u03bc", "\u00b5")
}

func normal(r rune) rune {
	if r == '\u03bc' {
		return '\u00b5'
	}
	return r
}

// Hundredths turns an em size in micrometres into hundredths of a point
// (1 point = 25 400/72 micrometres), rounded up. Type is set in whole
// hundredths of a point, so this is the size that reaches the paper: never
// smaller than asked for, and at most 3.6 micrometres larger.
func Hundredths(size int64) int64 {
	return ceilDiv(size*36, 127)
}

// Width returns how far s reaches along its baseline, in micrometres rounded
// up, at the given em size in micrometres (1 to 1,000,000; 0 or less gives
// 0). It measures the size that is really printed, see Hundredths. Ask
// Missing first: a missing rune counts as the width of the empty box.
func (f *Face) Width(s string, size int64) int64 {
	if f == nil || size <= 0 {
		return 0
	}
	var units int64
	for _, r := range s {
		units += f.glyph(r).advance
	}
	return ceilDiv(units*Hundredths(size)*127, 36*f.unitsPerEm)
}

// Extents returns how far the ink of s rises above and drops below its
// baseline, in micrometres rounded up, at the given em size in micrometres.
// Both are 0 or more; a blank string has neither.
func (f *Face) Extents(s string, size int64) (above, below int64) {
	if f == nil || size <= 0 {
		return 0, 0
	}
	for _, r := range s {
		g := f.glyph(r)
		above = max(above, g.yMax)
		below = max(below, -g.yMin)
	}
	scale := Hundredths(size) * 127
	return ceilDiv(above*scale, 36*f.unitsPerEm), ceilDiv(below*scale, 36*f.unitsPerEm)
}

func (f *Face) glyph(r rune) glyph {
	if g, ok := f.glyphs[normal(r)]; ok {
		return g
	}
	return f.notdef
}

// CapHeight returns the height of a flat capital in micrometres, rounded
// down, at the given em size in micrometres (OS/2 table, sCapHeight).
func (f *Face) CapHeight(size int64) int64 {
	if f == nil || size <= 0 {
		return 0
	}
	return size * f.capHeight / f.unitsPerEm
}

// XHeight returns the height of a small x in micrometres, rounded down, at
// the given em size in micrometres (OS/2 table, sxHeight).
func (f *Face) XHeight(size int64) int64 {
	if f == nil || size <= 0 {
		return 0
	}
	return size * f.xHeight / f.unitsPerEm
}

// Ascent returns the face's ascender above the baseline in micrometres,
// rounded up (hhea table). It leaves room for accents on capitals.
func (f *Face) Ascent(size int64) int64 {
	if f == nil || size <= 0 {
		return 0
	}
	return ceilDiv(size*f.ascent, f.unitsPerEm)
}

// Descent returns the face's descender below the baseline in micrometres, as
// a positive number rounded up (hhea table).
func (f *Face) Descent(size int64) int64 {
	if f == nil || size <= 0 {
		return 0
	}
	return ceilDiv(size*f.descent, f.unitsPerEm)
}

// SizeForCapHeight returns the smallest em size in micrometres whose capitals
// are at least h micrometres high; 0 for h of 0 or less.
func (f *Face) SizeForCapHeight(h int64) int64 {
	if f == nil || h <= 0 {
		return 0
	}
	return ceilDiv(h*f.unitsPerEm, f.capHeight)
}

// SizeForXHeight returns the smallest em size in micrometres whose small
// letters without ascender are at least h micrometres high; 0 for h of 0 or
// less.
func (f *Face) SizeForXHeight(h int64) int64 {
	if f == nil || h <= 0 {
		return 0
	}
	return ceilDiv(h*f.unitsPerEm, f.xHeight)
}

// ceilDiv divides rounding up; a is not negative and b is positive.
func ceilDiv(a, b int64) int64 {
	return (a + b - 1) / b
}
