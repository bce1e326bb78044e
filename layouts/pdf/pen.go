package pdf

import (
	"strconv"
	"strings"

	"drawup/fonts"
	"drawup/layouts/ink"

	"github.com/go-pdf/fpdf"
)

// dashes is 1 mm on, 1 mm off, in points.
const dashes = "[2.835 2.835] 0 d"

// family is the name under which the library keeps a face. It ends up as the
// font's name in the file, so it holds letters only.
func family(face ink.Face) string { return strings.ReplaceAll(string(face), "-", "") }

// pen draws marks on the library's current page. It remembers what has been
// set on the page so that nothing is set twice.
type pen struct {
	lib          *fpdf.Fpdf
	names        map[ink.Face]string // of the faces in the file
	out          []byte              // operators not yet handed to the library
	height       ink.Micrometre
	face         ink.Face
	em           int64       // hundredths of a point; 0 before the first text of a page
	fill, stroke *ink.Colour // nil: unknown
	width        ink.Micrometre
	dash         bool
}

// draw puts all marks of a page on the page just begun.
func (p *pen) draw(page ink.Page) {
	p.height = page.H
	p.fill, p.stroke, p.width, p.dash = nil, nil, 0, false
	p.face, p.em = "", 0
	for _, mark := range page.Marks {
		switch m := mark.(type) {
		case ink.Text:
			p.text(m)
		case ink.Rect:
			p.rect(m)
		case ink.Line:
			p.line(m)
		case ink.Polygon:
			p.polygon(m)
		case ink.Symbol:
			p.symbol(m)
		}
	}
	p.flush()
}

// flush hands the waiting operators to the library.
func (p *pen) flush() {
	if len(p.out) > 0 {
		p.lib.RawWriteStr(string(p.out[:len(p.out)-1]))
		p.out = p.out[:0]
	}
}

// text writes what the library's Text would write, with its letters as UTF-16
// in a string.
func (p *pen) text(m ink.Text) {
	if m.String == "" {
		return
	}
	p.setFill(m.Colour)
	// The face must be set before the matrix is saved, or restoring that
	// would undo it unnoticed.
	if em := fonts.Hundredths(int64(m.Size)); em != p.em || m.Face != p.face {
		p.face, p.em = m.Face, em
		p.op("BT /")
		p.op(p.names[m.Face])
		p.out = decimal(append(p.out, ' '), em, 2)
		p.op(" Tf ET\n")
	}
	if m.Rotate == 90 {
		p.op("q 0 1 -1 0")
		p.place(m.X, m.Y)
		p.op(" cm\nBT 0 0 Td (")
	} else {
		p.op("BT ")
		p.out = decimal(p.out, hundredths(m.X), 2)
		p.out = decimal(append(p.out, ' '), hundredths(p.height-m.Y), 2)
		p.op(" Td (")
	}
	for _, r := range m.String {
		if r == '\u03bc' {
			r = '\u00b5' // see fonts.Normalise
		}
		p.byte(byte(r >> 8))
		p.byte(byte(r))
	}
	p.op(") Tj ET\n")
	if m.Rotate == 90 {
		p.op("Q\n")
	}
}

// byte writes a byte of a string, with a backslash where it has a meaning
// there (ISO 32000-1:2008, 7.3.4.2).
func (p *pen) byte(b byte) {
	switch b {
	case '\\', '(', ')':
		p.out = append(p.out, '\\', b)
	case '\r':
		p.op("\\r")
	default:
		p.out = append(p.out, b)
	}
}

func (p *pen) rect(m ink.Rect) {
	how := "f"
	if m.Fill != nil {
		p.setFill(*m.Fill)
	}
	if m.Stroke != nil {
		p.setStroke(*m.Stroke, m.Width, false)
		how = "S"
		if m.Fill != nil {
			how = "B"
		}
	}
	left, right := thousandths(m.X), thousandths(m.X+m.W)
	foot, top := thousandths(p.height-m.Y-m.H), thousandths(p.height-m.Y)
	p.number(left)
	p.number(foot)
	p.number(right - left)
	p.number(top - foot)
	p.op(" re " + how + "\n")
}

func (p *pen) line(m ink.Line) {
	p.setStroke(m.Colour, m.Width, m.Dash)
	p.place(m.X1, m.Y1)
	p.op(" m")
	p.place(m.X2, m.Y2)
	p.op(" l S\n")
}

func (p *pen) polygon(m ink.Polygon) {
	p.setFill(m.Fill)
	for i, point := range m.Points {
		p.place(point.X, point.Y)
		if i == 0 {
			p.op(" m")
		} else {
			p.op(" l")
		}
	}
	p.op(" h f\n")
}

// symbol writes the dark runs of all rows, in modules under one matrix, as
// one path with one fill. Equal runs in rows that follow each other are one
// rectangle.
func (p *pen) symbol(m ink.Symbol) {
	p.setFill(m.Colour)
	side := millionths(m.Module)
	p.op("q")
	p.out = decimal(append(p.out, ' '), side, 6)
	p.op(" 0 0")
	p.out = decimal(append(p.out, ' '), -side, 6)
	p.place(m.X, m.Y)
	p.op(" cm\n")
	for y, row := range m.Rows {
		for x := 0; x < len(row); x++ {
			if row[x] != ink.Dark {
				continue
			}
			start := x
			for x < len(row) && row[x] == ink.Dark {
				x++
			}
			if y > 0 && isRun(m.Rows[y-1], start, x) {
				continue // part of the one that began above
			}
			high := 1
			for y+high < len(m.Rows) && isRun(m.Rows[y+high], start, x) {
				high++
			}
			p.whole(start, ' ')
			p.whole(y, ' ')
			p.whole(x-start, ' ')
			p.whole(high, ' ')
			p.op("re\n")
		}
	}
	p.op("f Q\n")
}

// isRun says whether the modules from start up to end are a dark run of a row,
// neither shorter nor longer.
func isRun(row string, start, end int) bool {
	for _, module := range []byte(row[start:end]) {
		if module != ink.Dark {
			return false
		}
	}
	return (start == 0 || row[start-1] != ink.Dark) && (end == len(row) || row[end] != ink.Dark)
}

// whole writes a number that is not negative, and what follows it.
func (p *pen) whole(n int, after byte) {
	if n < 10 {
		p.out = append(p.out, byte('0'+n), after)
		return
	}
	p.out = append(strconv.AppendInt(p.out, int64(n), 10), after)
}

func (p *pen) setFill(c ink.Colour) {
	if p.fill != nil && *p.fill == c {
		return
	}
	p.fill = &c
	p.colour(c, "rg\n")
}

func (p *pen) setStroke(c ink.Colour, width ink.Micrometre, dash bool) {
	if p.stroke == nil || *p.stroke != c {
		p.stroke = &c
		p.colour(c, "RG\n")
	}
	if p.width != width {
		p.width = width
		p.number(thousandths(width))
		p.op(" w\n")
	}
	if p.dash != dash {
		p.dash = dash
		if dash {
			p.op(dashes + "\n")
		} else {
			p.op("[] 0 d\n")
		}
	}
}

// colour writes the three parts to three decimals, enough to tell 256 steps
// apart.
func (p *pen) colour(c ink.Colour, operator string) {
	for _, part := range []uint8{c.R, c.G, c.B} {
		p.out = append(decimal(p.out, divide(int64(part)*1000, 255), 3), ' ')
	}
	p.op(operator)
}

// place writes a point of the page, turned to the origin at the foot.
func (p *pen) place(x, y ink.Micrometre) {
	p.number(thousandths(x))
	p.number(thousandths(p.height - y))
}

// number writes thousandths of a point.
func (p *pen) number(v int64) {
	if len(p.out) > 0 && p.out[len(p.out)-1] != '\n' {
		p.out = append(p.out, ' ')
	}
	p.out = decimal(p.out, v, 3)
}

func (p *pen) op(s string) { p.out = append(p.out, s...) }

// A point is 25 400/72 micrometres, so v micrometres are v·9/3175 points.
func hundredths(v ink.Micrometre) int64  { return divide(int64(v)*36, 127) }
func thousandths(v ink.Micrometre) int64 { return divide(int64(v)*360, 127) }
func millionths(v ink.Micrometre) int64  { return divide(int64(v)*360_000, 127) }

// divide divides to the nearest whole number, halves away from zero; b is
// positive.
func divide(a, b int64) int64 {
	if a < 0 {
		return -((-a + b/2) / b)
	}
	return (a + b/2) / b
}

// decimal appends v shifted right by the given number of decimals, without
// trailing zeros.
func decimal(out []byte, v int64, decimals int) []byte {
	if v < 0 {
		out, v = append(out, '-'), -v
	}
	power := int64(1)
	for range decimals {
		power *= 10
	}
	out = strconv.AppendInt(out, v/power, 10)
	rest := v % power
	if rest == 0 {
		return out
	}
	out = append(out, '.')
	for rest > 0 {
		power /= 10
		out = append(out, byte('0'+rest/power))
		rest %= power
	}
	return out
}
