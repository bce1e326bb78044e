package layouts_test

import (
	"strings"
	"testing"

	"drawup/labels"
	"drawup/layouts"
	"drawup/layouts/ink"
)

// A wrapped line keeps every letter, breaks at blanks of plain words only, and
// keeps a figure whole however narrow the column is.
func TestWrap(t *testing.T) {
	line := labels.Line{{Text: "draw "}, {Text: "7.2 mL", Figure: "dose.volume"}, {Text: ", then add sodium chloride ("}, {Text: "12 345.6 mL", Figure: "diluent.volume"}, {Text: ")"}}
	const size = 3000
	for width := ink.Micrometre(12_000); width < 90_000; width += 500 {
		rows, ok := layouts.Wrap(line, ink.Regular, size, width)
		if !ok {
			// "(12 345.6 mL)" may not be broken, so a column narrower than
			// that must be turned down.
			least := layouts.Width(labels.Words("(12 345.6 mL)"), ink.Regular, size)
			if width >= least {
				t.Errorf("width %d: got no rows, want some from %d on", width, least)
			}
			continue
		}
		var parts []string
		whole := 0
		for _, row := range rows {
			if got := layouts.Width(row, ink.Regular, size); got > width {
				t.Errorf("width %d: got a row %q of %d", width, row.Text(), got)
			}
			for _, c := range row {
				if c.Figure == "dose.volume" && c.Text == "7.2 mL" || c.Figure == "diluent.volume" && c.Text == "12 345.6 mL" {
					whole++
				}
			}
			parts = append(parts, row.Text())
		}
		if got := strings.Join(parts, " "); got != line.Text() || whole != 2 {
			t.Errorf("width %d: got %q with %d whole figures, want %q", width, got, whole, line.Text())
		}
	}
	if rows, ok := layouts.Wrap(labels.Words("  "), ink.Regular, size, 1000); !ok || len(rows) != 0 {
		t.Errorf("got %v, %v for blanks, want no row", rows, ok)
	}
}

func TestLargest(t *testing.T) {
	line := labels.Words("Glycopyrronium")
	got, ok := layouts.Largest(line, ink.Bold, 40_000, 2500, 7000)
	if !ok || layouts.Width(line, ink.Bold, layouts.SizeFor(ink.Bold, got)) > 40_000 {
		t.Errorf("got %d, %v, want a size that fits", got, ok)
	}
	if layouts.Width(line, ink.Bold, layouts.SizeFor(ink.Bold, got+50)) <= 40_000 {
		t.Errorf("got %d, want the largest", got)
	}
	if got, ok := layouts.Largest(line, ink.Bold, 10_000, 2500, 7000); ok {
		t.Errorf("got %d in 10 mm, want none", got)
	}
}

// Rule N26: a number and its unit in words stay on one row, also in a text
// that is no figure.
func TestWrapKeepsNumberAndUnit(t *testing.T) {
	line := labels.Words("give 250 mL over 24 h, then 0.5 micrograms/kg/min of it")
	for width := ink.Micrometre(14_000); width < 60_000; width += 500 {
		rows, ok := layouts.Wrap(line, ink.Regular, 3000, width)
		for i, row := range rows {
			text := row.Text()
			if last := text[len(text)-1]; ok && i < len(rows)-1 && last >= '0' && last <= '9' {
				t.Errorf("width %d: got a row that ends in a number, %q", width, text)
			}
		}
	}
}
