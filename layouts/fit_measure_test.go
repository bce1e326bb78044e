package layouts_test

import (
	"testing"

	"drawup/fonts"
	"drawup/labels"
	"drawup/layouts"
	"drawup/layouts/ink"
)

// Widths from the table are those that the face itself gives, to the
// micrometre, at any size, letters beyond the table included.
func TestWidthIsTheFaces(t *testing.T) {
	for _, name := range fonts.Names() {
		face := fonts.Get(name)
		for _, text := range []string{"", "Etomidate", "7.2 mg in 3.6 mL", "≤ 5 µg", "naïve – 10 %", "100 micrograms/mL"} {
			for size := ink.Micrometre(1); size < 9000; size += 37 {
				if got, want := layouts.Width(labels.Words(text), ink.Face(name), size), face.Width(text, int64(size)); int64(got) != want {
					t.Fatalf("%s %q at %d: got %d, want %d", name, text, size, got, want)
				}
			}
		}
	}
	if got := layouts.Width(labels.Words("a"), "no such face", 1000); got != 0 {
		t.Errorf("got %d for an unknown face", got)
	}
}

// Digits are equally wide and reach as far up and down in every face that a
// serial number may stand in, so that labels which differ in it alone can share
// one arrangement.
func TestDigitsAlike(t *testing.T) {
	for _, name := range fonts.Names() {
		for d := '1'; d <= '9'; d++ {
			if got, want := fonts.Get(name).Width(string(d), 100_000), fonts.Get(name).Width("0", 100_000); got != want {
				t.Errorf("%s: got %q %d wide, want %d", name, d, got, want)
			}
		}
	}
}
