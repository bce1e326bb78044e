package layouts_test

import (
	"image"
	"strings"
	"testing"

	"drawup/fonts"
	"drawup/labels"
	"drawup/layouts"
	"drawup/layouts/ink"
	"drawup/layouts/pdf/readback"
)

// short is the sheet of 65 with four rows only, so that a page at 600 dots per
// inch stays small.
func short(t testing.TB) layouts.Stock {
	s := stock(t, "a4-65")
	s.Rows, s.PageH = 4, 2*s.Top+4*s.PitchY
	return s
}

// A seen label is one label of a rendered page.
type seen struct {
	label      labels.Label
	img        *image.RGBA
	dpi        int
	x, y, w, h ink.Micrometre // of the panel
	runs       []readback.Run // all of the page
}

// look renders the labels, one page, and cuts it up.
func look(t testing.TB, list []labels.Label, s layouts.Stock, opt layouts.Options, dpi int) []seen {
	t.Helper()
	file := printed(t, placed(t, list, s, opt))
	img, runs := file.Render(1, dpi), file.Text(1)
	var out []seen
	for i, l := range list {
		p := s.Place(i + opt.Used)
		out = append(out, seen{l, img, dpi, p.X + s.Inset, p.Y + s.Inset, s.LabelW - 2*s.Inset, s.LabelH - 2*s.Inset, runs})
	}
	return out
}

func (s seen) at(x, y ink.Micrometre) ink.Colour { return readback.At(s.img, x, y, s.dpi) }

// run finds the text on this label.
func (s seen) run(t testing.TB, text string) readback.Run {
	t.Helper()
	for _, r := range s.runs {
		// The renderer adds a blank where other text follows on the row.
		if strings.TrimRight(r.Text, " ") == text && r.StartX > s.x && r.StartX < s.x+s.w && r.StartY > s.y && r.StartY < s.y+s.h {
			return r
		}
	}
	var have []string
	for _, r := range s.runs {
		if r.StartX > s.x && r.StartX < s.x+s.w {
			have = append(have, r.Text)
		}
	}
	t.Fatalf("%s: found no %q on the label, only %q", s.label.Name, text, have)
	return readback.Run{}
}

func dark(c ink.Colour) bool  { return c.R < 110 && c.G < 110 && c.B < 110 }
func light(c ink.Colour) bool { return c.R > 145 && c.G > 145 && c.B > 145 }

// like says whether a pixel has a colour, but for the renderer's rounding.
func like(a, b ink.Colour) bool {
	d := func(x, y uint8) bool { return int(x)-int(y) <= 3 && int(y)-int(x) <= 3 }
	return d(a.R, b.R) && d(a.G, b.G) && d(a.B, b.B)
}

func fill(c labels.Class) ink.Colour { return ink.Colour{R: c.Fill.R, G: c.Fill.G, B: c.Fill.B} }

// ISO 26825:2020, 5.4.2 and 5.4.3: capitals of the name at least 2.5 mm high,
// measured here on the rendered first letter from its foot to the first row of
// pixels without ink; baseline in the upper half; concentration below it.
func TestNameHeight(t *testing.T) {
	for _, s := range bothKinds(t, layouts.Options{}, 600) {
		name := s.run(t, s.label.Name)
		letter := dark
		if s.label.Class.Bar {
			letter = light
		}
		first := ink.Micrometre(fonts.Get(fonts.CondensedSemiBold).Width(s.label.Name[:1], int64(name.Size)))
		high := capitalOf(s, ink.Point{X: name.StartX, Y: name.StartY}, first, letter)
		if high < 2480 || high > 7200 {
			t.Errorf("%s: got capitals of %d micrometres, want at least 2500", s.label.Name, high)
		}
		if name.StartY > s.y+s.h/2 {
			t.Errorf("%s: the name stands in the lower half", s.label.Name)
		}
		figure := s.run(t, s.label.Concentration.Text)
		if high := figure.StartY - ink.Micrometre(fonts.Get(fonts.Bold).CapHeight(int64(figure.Size))); high < s.y+s.h/2 {
			t.Errorf("%s: the concentration begins in the upper half", s.label.Name)
		}
	}
}

// Colours as published for the inks of Table 1 (see labels.TestClassTable), on
// a point of the lower half beside everything; white where stripes are.
func TestBackground(t *testing.T) {
	for _, s := range bothKinds(t, layouts.Options{}, 300) {
		want := fill(s.label.Class)
		if s.label.Class.Stripes {
			want = ink.White
		}
		if got := s.at(s.x+450, s.y+s.h*54/100); !like(got, want) {
			t.Errorf("%s: got background %v, want %v", s.label.Class.Code, got, want)
		}
	}
}

// 5.2.2: white stripes 1 mm wide alternate with coloured ones, rising from
// lower left to upper right at 45 degrees. One of each is 2 mm across, 2.83 mm
// along the label. 5.4.4: at least the upper 20 % of the width and 15 % of the
// length on each side of the name, 0.5 mm above it; none behind or below it.
func TestStripes(t *testing.T) {
	for _, s := range bothKinds(t, layouts.Options{}, 600) {
		c := s.label.Class
		if !c.Stripes || c.Code == "PRO" {
			continue // protamine's stripes have the colour of the letters
		}
		on := func(x, y ink.Micrometre) bool { return like(s.at(x, y), fill(c)) }
		checkPitch(t, s, on)
		name := s.run(t, s.label.Name)
		left, right, low := ink.Micrometre(0), s.w, ink.Micrometre(0)
		top := s.h
		for y := ink.Micrometre(150); y < s.h-150; y += 50 {
			for x := ink.Micrometre(150); x < s.w-150; x += 50 {
				if !on(s.x+x, s.y+y) {
					continue
				}
				switch {
				case s.y+y > name.StartY-2400 && x < s.w/2:
					left = max(left, x)
				case s.y+y > name.StartY-2400:
					right = min(right, x)
				case x > s.w/4 && x < s.w*3/4:
					low = max(low, y)
				}
				top = min(top, y)
				if y > s.h/2 {
					t.Fatalf("%s: stripe in the lower half at %d,%d", c.Code, x, y)
				}
			}
		}
		if top > 200 || low < s.h/5-100 {
			t.Errorf("%s: got stripes from %d to %d above the name, want the upper %d", c.Code, top, low, s.h/5)
		}
		if least := s.w * 15 / 100; left < least-150 || s.w-right < least-150 || s.x+left > name.StartX || s.x+right < name.X+name.W-100 {
			t.Errorf("%s: got stripes to %d and from %d of %d, want %d on each side of the name", c.Code, left, right, s.w, least)
		}
		above, _ := fonts.Get(fonts.Bold).Extents(s.label.Name, int64(name.Size))
		if gap := name.StartY - ink.Micrometre(above) - s.y - low; gap < 500 {
			t.Errorf("%s: got %d micrometres between stripes and name, want 500", c.Code, gap)
		}
	}
}

// checkPitch measures pitch and direction in the band above the name.
func checkPitch(t *testing.T, s seen, on func(x, y ink.Micrometre) bool) {
	t.Helper()
	var starts []ink.Micrometre
	y := s.y + s.h/10
	for x, was := s.x+200, true; x < s.x+s.w-200; x += 10 {
		now := on(x, y)
		if now && !was {
			starts = append(starts, x)
		}
		was = now
	}
	n := len(starts)
	if n < 8 {
		t.Fatalf("%s: got %d stripes", s.label.Class.Code, n)
	}
	pitch := float64(starts[n-1]-starts[0]) / float64(n-1) / 1000
	if pitch < 2.80 || pitch > 2.86 {
		t.Errorf("%s: got a pitch of %.3f mm along the label, want 2.83", s.label.Class.Code, pitch)
	}
	for _, x := range starts[:n-1] {
		// The middle of a stripe is 0.71 mm after its start.
		for d := ink.Micrometre(-1000); d <= 1000; d += 500 {
			if !on(x+700+d, y-d) {
				t.Errorf("%s: no colour %d up the stripe at %d", s.label.Class.Code, d, x)
			}
		}
		// Across, 1 mm on, is the middle of the white stripe.
		if on(x+700+707, y+707) || on(x+700-707, y-707) {
			t.Errorf("%s: colour 1 mm across the stripe at %d", s.label.Class.Code, x)
		}
	}
}

// Black bar edge to edge over the upper half for suxamethonium and adrenaline
// and nothing else (Association of Anaesthetists 2014); black line below the
// name for relaxant reversal and nothing else (ISO 26825:2020, 5.4.4).
func TestBarAndLine(t *testing.T) {
	for _, mono := range []bool{false, true} {
		for _, s := range bothKinds(t, layouts.Options{Mono: mono}, 300) {
			code := s.label.Class.Code
			bar := true
			for _, part := range []ink.Micrometre{5, 10, 20, 30, 40, 48} {
				bar = bar && dark(s.at(s.x+400, s.y+s.h*part/100)) && dark(s.at(s.x+s.w-400, s.y+s.h*part/100))
			}
			if want := code == "SUX" || code == "ADR"; bar != want {
				t.Errorf("%s, mono %v: got bar %v, want %v", code, mono, bar, want)
			}
			if dark(s.at(s.x+400, s.y+s.h*54/100)) {
				t.Errorf("%s, mono %v: the lower half is black", code, mono)
			}
			if !s.label.Class.Stripes {
				continue
			}
			// Beside the name, where stripes have ended, only the line is black.
			name := s.run(t, s.label.Name)
			thick := ink.Micrometre(0)
			for y := name.StartY; y < s.y+s.h/2; y += 20 {
				if dark(s.at(name.StartX-200, y)) {
					thick += 20
				}
			}
			if want := code == "NMB-R"; want != (thick >= 300) || !want && thick > 0 {
				t.Errorf("%s, mono %v: got a line %d micrometres thick", code, mono, thick)
			}
		}
	}
}

// Colour is never the only cue (R16): the class word stands along the bottom
// edge in colour and in mono, and without colour only black and white are left.
func TestClassWordAndMono(t *testing.T) {
	for _, mono := range []bool{false, true} {
		for _, name := range []string{"a4-65", "a4-24"} {
			s := stock(t, name)
			for _, l := range look(t, samples(), s, layouts.Options{Mono: mono}, 72) {
				word := l.run(t, l.label.Class.Word)
				if l.y+l.h-word.StartY > 1000 {
					t.Errorf("%s: got the class word %d above the edge", l.label.Class.Code, l.y+l.h-word.StartY)
				}
				// "in 1.8 mm type": our reading is the em size, 1.2 mm capitals.
				if word.Size < 1700 {
					t.Errorf("%s: got class word in type of %d", l.label.Class.Code, word.Size)
				}
			}
		}
	}
	for _, mark := range placed(t, samples(), stock(t, "a4-65"), layouts.Options{Mono: true})[0].Marks {
		for _, c := range coloursOf(mark) {
			if c != ink.Black && c != ink.White {
				t.Errorf("got colour %v in mono: %v", c, mark)
			}
		}
	}
}

func coloursOf(mark ink.Mark) []ink.Colour {
	switch m := mark.(type) {
	case ink.Text:
		return []ink.Colour{m.Colour}
	case ink.Line:
		return []ink.Colour{m.Colour}
	case ink.Polygon:
		return []ink.Colour{m.Fill}
	case ink.Symbol:
		return []ink.Colour{m.Colour}
	case ink.Rect:
		var out []ink.Colour
		for _, c := range []*ink.Colour{m.Fill, m.Stroke} {
			if c != nil {
				out = append(out, *c)
			}
		}
		return out
	}
	return nil
}

// White type stands in a black bar and nowhere else; all other type is black.
func TestWhiteTypeOnlyInBar(t *testing.T) {
	for _, l := range samples() {
		for _, mark := range placed(t, []labels.Label{l}, stock(t, "a4-24"), layouts.Options{})[0].Marks {
			text, ok := mark.(ink.Text)
			if !ok || text.Colour == ink.Black {
				continue
			}
			if !l.Class.Bar || text.Colour != ink.White || text.Y > ink.MM(18) {
				t.Errorf("%s: got %q in %v", l.Class.Code, text.String, text.Colour)
			}
		}
	}
}
