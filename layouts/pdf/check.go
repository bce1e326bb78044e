package pdf

import (
	"fmt"
	"slices"
	"strings"
	"unicode/utf8"

	"drawup/fonts"
	"drawup/layouts/ink"
)

// MissingGlyph says that a face cannot show a rune. Nothing is written then:
// an empty box or a gap in a drug's name is worse than no label.
type MissingGlyph struct {
	Rune rune
	Text string
	Page int // from 1
}

func (e MissingGlyph) Error() string {
	return fmt.Sprintf("page %d: got %U in %q, want only letters that the face has", e.Page, e.Rune, e.Text)
}

// OffPage says that a mark reaches beyond the edge of its page.
type OffPage struct {
	Page int    // from 1
	Mark string // kind of mark, with its text if it has one
	// The mark's box and the page's size.
	Left, Top, Right, Bottom, W, H ink.Micrometre
}

func (e OffPage) Error() string {
	return fmt.Sprintf("page %d: got %s from %d,%d to %d,%d, want within %dx%d micrometres",
		e.Page, e.Mark, e.Left, e.Top, e.Right, e.Bottom, e.W, e.H)
}

// BadMark says that a mark cannot be drawn as it is.
type BadMark struct {
	Page   int // from 1
	Mark   string
	Reason string // "got X, want Y"
}

func (e BadMark) Error() string {
	return fmt.Sprintf("page %d: %s: %s", e.Page, e.Mark, e.Reason)
}

// BadDocument says that something about the document as a whole is missing or
// wrong.
type BadDocument struct {
	Field  string
	Reason string // "got X, want Y"
}

func (e BadDocument) Error() string {
	return fmt.Sprintf("document %s: %s", e.Field, e.Reason)
}

// widest is the largest side of a page: 200 inches, the limit of PDF viewers
// (ISO 32000-1:2008, annex C.2, 14 400 units).
const widest ink.Micrometre = 5_080_000

// letters are the runes of one face that a document uses.
type letters struct {
	face ink.Face
	low  [256]bool
	high map[rune]bool
}

// add notes the runes of a text.
func (l *letters) add(text string) {
	for _, r := range text {
		if int(r) < len(l.low) {
			l.low[r] = true
			continue
		}
		if l.high == nil {
			l.high = map[rune]bool{}
		}
		l.high[r] = true
	}
}

// text is every rune once, as it is drawn, in order.
func (l *letters) text() string {
	var all []rune
	for r := range l.low {
		if l.low[r] {
			all = append(all, rune(r))
		}
	}
	for r := range l.high {
		all = append(all, r)
	}
	slices.Sort(all)
	return fonts.Normalise(string(all))
}

// A checker checks one document. It remembers texts that it has measured: most
// stand on page after page.
type checker struct {
	used []*letters
	seen map[measured]reach
}

// A measured is a text in a face and size, a reach its box about its origin.
type measured struct {
	face ink.Face
	size ink.Micrometre
	text string
}

type reach struct{ width, above, below ink.Micrometre }

// keptTexts bounds what a checker remembers.
const keptTexts = 4096

// check finds the first fault of a document. Without one it returns the faces
// in use with their letters, in the order of fonts.Names.
func check(doc Document) ([]letters, error) {
	if err := checkAbout(doc); err != nil {
		return nil, err
	}
	c := checker{seen: map[measured]reach{}}
	for i, page := range doc.Pages {
		if page.W <= 0 || page.H <= 0 || page.W > widest || page.H > widest {
			return nil, BadDocument{"page size", fmt.Sprintf("got %dx%d micrometres on page %d, want 1 to %d each", page.W, page.H, i+1, widest)}
		}
		if page.Bookmark != "" {
			if err := checkWords("bookmark", page.Bookmark); err != nil {
				return nil, err
			}
			// The library encodes a bookmark in Unicode only while such a
			// face is chosen.
			if len(c.used) == 0 {
				c.letters(ink.Regular)
			}
		}
		for _, mark := range page.Marks {
			if err := c.checkMark(i+1, page, mark); err != nil {
				return nil, err
			}
		}
	}
	var faces []letters
	for _, name := range fonts.Names() {
		for _, l := range c.used {
			if l.face == ink.Face(name) {
				faces = append(faces, *l)
			}
		}
	}
	return faces, nil
}

// letters finds the list of a face, a new one if need be.
func (c *checker) letters(face ink.Face) *letters {
	for _, l := range c.used {
		if l.face == face {
			return l
		}
	}
	l := &letters{face: face}
	c.used = append(c.used, l)
	return l
}

// measure notes the letters of a text that has no fault of its own and gives
// its reach, or the first rune that its face cannot show.
func (c *checker) measure(m ink.Text) (reach, rune, bool) {
	key := measured{m.Face, m.Size, m.String}
	if r, ok := c.seen[key]; ok {
		return r, 0, true
	}
	face := faceOf(m.Face)
	if missing := face.Missing(m.String); len(missing) > 0 {
		return reach{}, missing[0], false
	}
	above, below := face.Extents(m.String, int64(m.Size))
	r := reach{ink.Micrometre(face.Width(m.String, int64(m.Size))), ink.Micrometre(above), ink.Micrometre(below)}
	c.letters(m.Face).add(m.String)
	if len(c.seen) >= keptTexts {
		clear(c.seen)
	}
	c.seen[key] = r
	return r, 0, true
}

func checkAbout(doc Document) error {
	if len(doc.Pages) == 0 {
		return BadDocument{"pages", "got none, want at least one"}
	}
	if doc.Made.IsZero() {
		return BadDocument{"made", "got no date, want one"}
	}
	for _, word := range []struct{ field, text string }{
		{"title", doc.Title}, {"subject", doc.Subject}, {"keywords", doc.Keywords}, {"creator", doc.Creator},
	} {
		if err := checkWords(word.field, word.text); err != nil {
			return err
		}
	}
	for _, r := range doc.Language {
		if (r < 'a' || r > 'z') && (r < 'A' || r > 'Z') && (r < '0' || r > '9') && r != '-' {
			return BadDocument{"language", fmt.Sprintf("got %q, want letters, digits and hyphens", doc.Language)}
		}
	}
	return nil
}

// checkWords turns down what the library would garble or break on: bytes that
// are not UTF-8, runes above U+FFFF, control characters.
func checkWords(field, text string) error {
	for _, r := range text {
		if r < ' ' || r == utf8.RuneError || r > 0xFFFF {
			return BadDocument{field, fmt.Sprintf("got %U in %q, want printable runes up to U+FFFF", r, text)}
		}
	}
	return nil
}

func faceOf(face ink.Face) *fonts.Face { return fonts.Get(fonts.Name(face)) }

// box is the space a mark takes on its page.
type box struct{ left, top, right, bottom ink.Micrometre }

func (b *box) add(x, y ink.Micrometre) {
	b.left, b.right = min(b.left, x), max(b.right, x)
	b.top, b.bottom = min(b.top, y), max(b.bottom, y)
}

// within reports whether the box lies on the page. A box that ends before it
// begins comes from lengths beyond 64 bits.
func (b box) within(page ink.Page) bool {
	return 0 <= b.left && b.left <= b.right && b.right <= page.W &&
		0 <= b.top && b.top <= b.bottom && b.bottom <= page.H
}

// checkMark checks one mark by itself and against the page's edges.
func (c *checker) checkMark(number int, page ink.Page, mark ink.Mark) error {
	var reason string
	var b box
	switch m := mark.(type) {
	case ink.Text:
		if reason = textFault(m); reason == "" {
			r, missing, ok := c.measure(m)
			if !ok {
				return MissingGlyph{missing, m.String, number}
			}
			b = textBox(m, r)
		}
	case ink.Rect:
		reason, b = rectFault(m), rectBox(m)
	case ink.Line:
		reason, b = lineFault(m), lineBox(m)
	case ink.Polygon:
		reason, b = polygonFault(m), polygonBox(m)
	case ink.Symbol:
		reason, b = symbolFault(m), symbolBox(m)
	default:
		reason = "got an unknown mark, want Text, Rect, Line, Polygon or Symbol"
	}
	if reason != "" {
		return BadMark{number, name(mark), reason}
	}
	if !b.within(page) {
		return OffPage{number, name(mark), b.left, b.top, b.right, b.bottom, page.W, page.H}
	}
	return nil
}

// name says in an error which mark is meant.
func name(mark ink.Mark) string {
	switch m := mark.(type) {
	case ink.Text:
		return fmt.Sprintf("text %q", m.String)
	case ink.Rect:
		return "rectangle"
	case ink.Line:
		return "line"
	case ink.Polygon:
		return "polygon"
	case ink.Symbol:
		return "symbol"
	}
	return fmt.Sprintf("mark %T", mark)
}

func textFault(m ink.Text) string {
	switch {
	case faceOf(m.Face) == nil:
		return fmt.Sprintf("got face %q, want one of %q", m.Face, fonts.Names())
	case m.Size <= 0 || m.Size > widest:
		return fmt.Sprintf("got size %d, want 1 to %d micrometres", m.Size, widest)
	case m.Rotate != 0 && m.Rotate != 90:
		return fmt.Sprintf("got a turn of %d degrees, want 0 or 90", m.Rotate)
	}
	return ""
}

// textBox is the box of the ink: accents and descenders count only if the
// text has them.
func textBox(m ink.Text, r reach) box {
	if m.Rotate == 90 {
		return box{m.X - r.above, m.Y - r.width, m.X + r.below, m.Y}
	}
	return box{m.X, m.Y - r.above, m.X + r.width, m.Y + r.below}
}

func rectFault(m ink.Rect) string {
	switch {
	case m.W <= 0 || m.H <= 0:
		return fmt.Sprintf("got %dx%d, want more than 0 each", m.W, m.H)
	case m.Fill == nil && m.Stroke == nil:
		return "got neither fill nor stroke, want one"
	case m.Stroke != nil && m.Width <= 0:
		return fmt.Sprintf("got stroke width %d, want more than 0", m.Width)
	}
	return ""
}

func rectBox(m ink.Rect) box {
	var half ink.Micrometre
	if m.Stroke != nil {
		half = m.Width / 2
	}
	return box{m.X - half, m.Y - half, m.X + m.W + half, m.Y + m.H + half}
}

func lineFault(m ink.Line) string {
	switch {
	case m.Width <= 0:
		return fmt.Sprintf("got width %d, want more than 0", m.Width)
	case m.X1 == m.X2 && m.Y1 == m.Y2:
		return "got two ends in one place, want a length"
	}
	return ""
}

// lineBox is exact along the page; a slanting stroke is thinner than its box.
func lineBox(m ink.Line) box {
	half := m.Width / 2
	b := box{m.X1, m.Y1, m.X1, m.Y1}
	b.add(m.X2, m.Y2)
	if m.X1 != m.X2 {
		b.top, b.bottom = b.top-half, b.bottom+half
	}
	if m.Y1 != m.Y2 {
		b.left, b.right = b.left-half, b.right+half
	}
	return b
}

func polygonFault(m ink.Polygon) string {
	if len(m.Points) < 3 {
		return fmt.Sprintf("got %d points, want three or more", len(m.Points))
	}
	return ""
}

func polygonBox(m ink.Polygon) box {
	if len(m.Points) == 0 {
		return box{}
	}
	b := box{m.Points[0].X, m.Points[0].Y, m.Points[0].X, m.Points[0].Y}
	for _, p := range m.Points {
		b.add(p.X, p.Y)
	}
	return b
}

func symbolFault(m ink.Symbol) string {
	if m.Module <= 0 || m.Module > widest {
		return fmt.Sprintf("got module %d, want 1 to %d micrometres", m.Module, widest)
	}
	if len(m.Rows) == 0 || len(m.Rows[0]) == 0 {
		return "got no modules, want at least one"
	}
	for i, row := range m.Rows {
		if len(row) != len(m.Rows[0]) {
			return fmt.Sprintf("got %d modules in row %d, want %d as in the first", len(row), i+1, len(m.Rows[0]))
		}
		if rest := strings.TrimLeft(row, "#."); rest != "" {
			return fmt.Sprintf("got row %q, want only %q and %q", row, ink.Dark, ink.Light)
		}
	}
	return ""
}

func symbolBox(m ink.Symbol) box {
	if len(m.Rows) == 0 {
		return box{}
	}
	columns, rows := ink.Micrometre(len(m.Rows[0])), ink.Micrometre(len(m.Rows))
	return box{m.X, m.Y, m.X + columns*m.Module, m.Y + rows*m.Module}
}
