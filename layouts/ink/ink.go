// Package ink holds the marks that make up a page and nothing that decides
// where they go. Every length is in whole micrometres; the origin is the top
// left corner of the page, x runs to the right and y down.
//
// Marks are drawn in the order of the list, later ones over earlier ones.
// The package imports only the standard library: it cannot measure text.
package ink

// Micrometre is a length on paper, 1/1000 of a millimetre.
type Micrometre int64

// MM returns n millimetres.
func MM(n int64) Micrometre { return Micrometre(n) * 1000 }

// Tenths returns n tenths of a millimetre.
func Tenths(n int64) Micrometre { return Micrometre(n) * 100 }

// Colour is a colour in sRGB, 0 to 255 each.
type Colour struct{ R, G, B uint8 }

// The two colours that need no standard.
var (
	Black = Colour{0, 0, 0}
	White = Colour{255, 255, 255}
)

// Use returns a pointer to a copy of c, for the optional colours of a Rect.
func Use(c Colour) *Colour { return &c }

// Face names a type face. The names are those of package fonts, which this
// package may not import.
type Face string

// The four faces.
const (
	Regular           Face = "regular"
	Bold              Face = "bold"
	CondensedRegular  Face = "condensed-regular"
	CondensedSemiBold Face = "condensed-semibold"
)

// Point is a place on the page.
type Point struct{ X, Y Micrometre }

// Mark is one of Text, Rect, Line, Polygon and Symbol.
type Mark interface{ mark() }

// Text is one line of type.
type Text struct {
	// X, Y is the left end of the baseline.
	X, Y Micrometre
	// Size is the em size, from which a face's cap height follows.
	Size   Micrometre
	Face   Face
	Colour Colour
	String string
	// Rotate is 0, or 90 for text that reads upwards: it is turned about
	// X, Y a quarter anticlockwise, so that the baseline runs up the page.
	Rotate int
}

// Rect is a rectangle with sides along the page. X, Y is its top left corner.
type Rect struct {
	X, Y, W, H Micrometre
	// Fill and Stroke may each be nil; a rectangle with neither is an error
	// when it is written.
	Fill, Stroke *Colour
	// Width is that of the stroke, which lies half inside and half outside
	// the edge; it matters only with a Stroke.
	Width Micrometre
}

// Line is a straight stroke with square-cut ends.
type Line struct {
	X1, Y1, X2, Y2 Micrometre
	Width          Micrometre
	Colour         Colour
	// Dash breaks the line into dashes of 1 mm with gaps of 1 mm.
	Dash bool
}

// Polygon is a filled shape with straight sides, closed by itself. A point
// enclosed twice is filled as well (nonzero winding rule).
type Polygon struct {
	Points []Point // three or more
	Fill   Colour
}

// Dark and Light are the only bytes in the rows of a Symbol.
const (
	Dark  = '#'
	Light = '.'
)

// Symbol is a matrix symbol such as a Data Matrix. Its dark modules are drawn
// as one path with one fill: filled one by one they grow into each other in
// some renderers until no scanner reads them. The quiet zone is the layout's
// business and not part of Rows.
type Symbol struct {
	// X, Y is the top left corner of the top left module.
	X, Y Micrometre
	// Module is the side of one module.
	Module Micrometre
	// Rows holds one string a row from the top, all of one length, made of
	// the bytes Dark and Light.
	Rows   []string
	Colour Colour
}

// Page is one page of paper.
type Page struct {
	W, H  Micrometre
	Marks []Mark
	// Bookmark is the page's title in the document outline; empty for none.
	Bookmark string
}

func (Text) mark()    {}
func (Rect) mark()    {}
func (Line) mark()    {}
func (Polygon) mark() {}
func (Symbol) mark()  {}

// Add appends marks to the page.
func (p *Page) Add(marks ...Mark) { p.Marks = append(p.Marks, marks...) }

// Filled returns a rectangle filled with c and without a stroke.
func Filled(x, y, w, h Micrometre, c Colour) Rect {
	return Rect{X: x, Y: y, W: w, H: h, Fill: Use(c)}
}

// Outlined returns a rectangle with a stroke of the given width and no fill.
func Outlined(x, y, w, h, width Micrometre, c Colour) Rect {
	return Rect{X: x, Y: y, W: w, H: h, Stroke: Use(c), Width: width}
}

// Rule returns a black horizontal line from x to x+w at height y.
func Rule(x, y, w, width Micrometre) Line {
	return Line{X1: x, Y1: y, X2: x + w, Y2: y, Width: width, Colour: Black}
}
