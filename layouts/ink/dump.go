package ink

import (
	"bufio"
	"fmt"
	"io"
	"strings"
)

// Dump writes one line a page and one line a mark, in drawing order, for
// people to read and tests to compare. All lengths are micrometres. It
// returns the error of w, or an error that names a mark it does not know.
func Dump(w io.Writer, pages []Page) error {
	out := bufio.NewWriter(w)
	for i, page := range pages {
		fmt.Fprintf(out, "page %d %dx%d", i+1, page.W, page.H)
		if page.Bookmark != "" {
			fmt.Fprintf(out, " bookmark %q", page.Bookmark)
		}
		fmt.Fprintln(out)
		for _, mark := range page.Marks {
			line, err := describe(mark)
			if err != nil {
				return fmt.Errorf("page %d: %w", i+1, err)
			}
			fmt.Fprintln(out, line)
		}
	}
	return out.Flush()
}

// describe says in one line what and where a mark is.
func describe(mark Mark) (string, error) {
	switch m := mark.(type) {
	case Text:
		turned := ""
		if m.Rotate != 0 {
			turned = fmt.Sprintf(" rotate %d", m.Rotate)
		}
		return fmt.Sprintf("text %d,%d size %d %s %s%s %q", m.X, m.Y, m.Size, m.Face, m.Colour, turned, m.String), nil
	case Rect:
		line := fmt.Sprintf("rect %d,%d %dx%d", m.X, m.Y, m.W, m.H)
		if m.Fill != nil {
			line += " fill " + m.Fill.String()
		}
		if m.Stroke != nil {
			line += fmt.Sprintf(" stroke %s width %d", m.Stroke, m.Width)
		}
		return line, nil
	case Line:
		dash := ""
		if m.Dash {
			dash = " dash"
		}
		return fmt.Sprintf("line %d,%d %d,%d width %d %s%s", m.X1, m.Y1, m.X2, m.Y2, m.Width, m.Colour, dash), nil
	case Polygon:
		var points strings.Builder
		for _, p := range m.Points {
			fmt.Fprintf(&points, " %d,%d", p.X, p.Y)
		}
		return fmt.Sprintf("polygon fill %s%s", m.Fill, points.String()), nil
	case Symbol:
		return fmt.Sprintf("symbol %d,%d module %d %s rows %s", m.X, m.Y, m.Module, m.Colour, strings.Join(m.Rows, "|")), nil
	}
	return "", fmt.Errorf("got mark %T, want Text, Rect, Line, Polygon or Symbol", mark)
}

// String returns the colour as # and six hexadecimal digits.
func (c Colour) String() string {
	return fmt.Sprintf("#%02x%02x%02x", c.R, c.G, c.B)
}
