package layouts_test

import (
	"fmt"
	"image"
	"strings"
	"testing"

	"drawup/fonts"
	"drawup/labels"
	"drawup/layouts"
	"drawup/layouts/ink"
)

// pumps holds one infusion label of every class, with all that one may carry.
func pumps() []labels.Label {
	list := samples()
	for i := range list {
		l := &list[i]
		l.Infusion, l.CheckedBy, l.Patient = true, true, "HM-01"
		l.Diluent, l.Route = labels.Words("in glucose 5 %"), "intravenous"
		l.Digest, l.Marks = "3f9c21aa", []string{labels.MarkStarter, labels.MarkUnverified}
	}
	return list
}

// pumpSheet is the sheet of 24 with six rows only: 17 labels and the note.
func pumpSheet(t testing.TB) layouts.Stock {
	s := stock(t, "a4-24")
	s.Rows, s.PageH = 6, 2*s.Top+6*s.PitchY
	return s
}

// bothKinds renders the syringe labels and the infusion labels of every class.
// The larger page is drawn at half the resolution at most: its stripes and
// letters are as large or larger.
func bothKinds(t testing.TB, opt layouts.Options, dpi int) []seen {
	t.Helper()
	return append(look(t, samples(), short(t), opt, dpi), look(t, pumps(), pumpSheet(t), opt, min(dpi, 300))...)
}

// Every class, on both kinds of label and in both editions, in grey as a
// printer without colours or a copier gives it: stripes, bar, line and the
// class word are left, and no two classes have them all in common (rule R16).
func TestGreyTellsClassesApart(t *testing.T) {
	for _, mono := range []bool{false, true} {
		met := map[int]map[string]string{}
		for i, s := range bothKinds(t, layouts.Options{Mono: mono}, 300) {
			kind := i / len(samples())
			if met[kind] == nil {
				met[kind] = map[string]string{}
			}
			s.run(t, s.label.Class.Word)
			cue := fmt.Sprintf("%s, %s", s.label.Class.Word, shapeInGrey(s))
			if other, twice := met[kind][cue]; twice {
				t.Errorf("mono %v: %s and %s look alike in grey: %s", mono, other, s.label.Class.Code, cue)
			}
			met[kind][cue] = s.label.Class.Code
			want := fmt.Sprintf("stripes %v, bar %v", s.label.Class.Stripes, s.label.Class.Bar)
			if got := shapeInGrey(s); got != want {
				t.Errorf("mono %v, %s: got %s in grey, want %s", mono, s.label.Class.Code, got, want)
			}
		}
	}
}

// shapeInGrey finds stripes and bar by their lightness alone: changes of light
// and dark along the band at the top, and black at both ends of it.
func shapeInGrey(s seen) string {
	grey := func(x, y ink.Micrometre) int {
		c := s.at(x, y)
		return (299*int(c.R) + 587*int(c.G) + 114*int(c.B)) / 1000
	}
	y := s.y + s.h/10
	changes, was := 0, grey(s.x+300, y)
	for x := s.x + 300; x < s.x+s.w-300; x += 100 {
		if now := grey(x, y); now-was > 12 || was-now > 12 {
			changes, was = changes+1, now
		}
	}
	bar := true
	for _, part := range []ink.Micrometre{3, 15, 30, 45} {
		bar = bar && grey(s.x+300, s.y+s.h*part/100) < 60 && grey(s.x+s.w-300, s.y+s.h*part/100) < 60
	}
	return fmt.Sprintf("stripes %v, bar %v", changes > 16 && !bar, bar)
}

// Nothing of a label is printed outside its panel: between the labels of a sheet
// the paper stays as it is, whatever the class.
func TestNothingOutsideTheLabel(t *testing.T) {
	for _, opt := range []layouts.Options{{}, {Mono: true}} {
		for _, s := range bothKinds(t, opt, 300) {
			for _, off := range []ink.Micrometre{250, 500, 900} {
				for k := range ink.Micrometre(60) {
					x, y := s.x-off+(s.w+2*off)*k/59, s.y-off+(s.h+2*off)*k/59
					for _, p := range []ink.Point{{X: x, Y: s.y - off}, {X: x, Y: s.y + s.h + off}, {X: s.x - off, Y: y}, {X: s.x + s.w + off, Y: y}} {
						if p.X < 0 || p.Y < 0 {
							continue
						}
						if c := s.at(p.X, p.Y); c != ink.White {
							t.Fatalf("%s: got %v at %d,%d, %d outside the label", s.label.Name, c, p.X-s.x, p.Y-s.y, off)
						}
					}
				}
			}
		}
	}
}

// Rule N27: a figure is one piece of text in one size, so that its digits are as
// high as each other and its unit as large as its number.
func TestFiguresHaveOneSize(t *testing.T) {
	for _, s := range bothKinds(t, layouts.Options{}, 72) {
		for _, line := range []labels.Line{{s.label.Concentration}, s.label.Amount, s.label.UseBy} {
			if run := s.run(t, line.Text()); run.Size < 1700 {
				t.Errorf("%s: got %q in type of %d", s.label.Name, run.Text, run.Size)
			}
		}
	}
}

// Rule N26 and R15: no row of a label ends between a number and its unit.
func TestNoRowEndsInANumber(t *testing.T) {
	for _, s := range bothKinds(t, layouts.Options{}, 72) {
		for _, r := range s.runs {
			text := strings.TrimRight(r.Text, " ")
			if r.StartX < s.x || r.StartX > s.x+s.w || r.StartY < s.y || r.StartY > s.y+s.h {
				continue
			}
			for _, unit := range []string{"mL", "mg", "mg/mL", "micrograms", "micrograms/mL", "units/mL", "%", "h"} {
				if strings.HasPrefix(text, unit+" ") || text == unit {
					t.Errorf("%s: got a piece of text that begins with a unit: %q", s.label.Name, text)
				}
			}
		}
	}
}

// 5.4.4: on striped labels the name stands in white, clear of the stripes by
// 0.5 mm above and by 0.3 mm, our choice, at its ends; none runs behind or below
// it down to the middle of the label.
func TestNameStandsInWhite(t *testing.T) {
	for _, s := range bothKinds(t, layouts.Options{}, 600) {
		if !s.label.Class.Stripes {
			continue
		}
		name := s.run(t, s.label.Name)
		face := fonts.Get(fonts.CondensedSemiBold)
		if strings.HasSuffix(name.Font, "bold") && !strings.Contains(name.Font, "condensed") {
			face = fonts.Get(fonts.Bold)
		}
		width := ink.Micrometre(face.Width(s.label.Name, int64(name.Size)))
		up, _ := face.Extents(s.label.Name, int64(name.Size))
		left, right := name.StartX-300, name.StartX+width+300
		for y := name.StartY - ink.Micrometre(up) - 500; y < s.y+s.h/2; y += 40 {
			for x := left; x < right; x += 40 {
				if c := s.at(x, y); !greyish(c) {
					t.Fatalf("%s: got colour %v at %d,%d, beside or behind the name", s.label.Class.Code, c, x-name.StartX, y-name.StartY)
				}
			}
		}
	}
}

// greyish is a colour without hue: letters, their smooth edges, white.
func greyish(c ink.Colour) bool {
	least, most := min(c.R, c.G, c.B), max(c.R, c.G, c.B)
	return most-least < 12
}

// A letter of the name is drawn as high as it was measured: the capital of every
// class on both kinds of label, between its foot and the first row without ink.
func capitalOf(s seen, start ink.Point, width ink.Micrometre, inked func(ink.Colour) bool) ink.Micrometre {
	row, height := int(start.Y)*s.dpi/25400-1, 0
	for ; row > 0 && rowInked(s.img, row, int(start.X)*s.dpi/25400, int(start.X+width)*s.dpi/25400, inked); row-- {
		height++
	}
	return ink.Micrometre(height * 25400 / s.dpi)
}

func rowInked(img *image.RGBA, row, from, to int, inked func(ink.Colour) bool) bool {
	for x := from; x < to; x++ {
		if c := img.RGBAAt(x, row); inked(ink.Colour{R: c.R, G: c.G, B: c.B}) {
			return true
		}
	}
	return false
}

// The reversal line covers the ends of the stripes: no sliver of them shows
// below it, at either end.
func TestNoStripeBelowTheLine(t *testing.T) {
	for _, s := range bothKinds(t, layouts.Options{}, 600) {
		if !s.label.Class.Line {
			continue
		}
		for _, x := range []ink.Micrometre{s.x + 500, s.x + 1500, s.x + 2500, s.x + 3500} {
			y := s.y + s.h*2/5
			for ; !dark(s.at(x, y)) && y < s.y+s.h*3/5; y += 20 {
			}
			for ; dark(s.at(x, y)) && y < s.y+s.h; y += 20 {
			}
			for end := y + 400; y < end; y += 20 {
				if c := s.at(x, y); !greyish(c) {
					t.Errorf("%s: got %v below the line at %d", s.label.Name, c, x-s.x)
				}
			}
		}
	}
}

// Two concentrations stand clear of each other: the tails of the upper one end
// above the dots and stems of the lower one.
func TestConcentrationsApart(t *testing.T) {
	l := sample("NMB-R", "Neostigmine", "2.5 mg/mL", "2.5 mg", "N07AA51", "2.5mg/mL")
	l.Second, l.SecondConcentration = "glycopyrronium", labels.Cell{Text: "500 micrograms/mL", Figure: "second.concentration"}
	var low, high ink.Micrometre
	for _, mark := range placed(t, []labels.Label{l}, stock(t, "roll-70x37"), layouts.Options{})[0].Marks {
		if m, ok := mark.(ink.Text); ok {
			up, down := fonts.Get(fonts.Name(m.Face)).Extents(m.String, int64(m.Size))
			switch m.String {
			case l.Concentration.Text:
				low = m.Y + ink.Micrometre(down)
			case l.SecondConcentration.Text:
				high = m.Y - ink.Micrometre(up)
			}
		}
	}
	if low == 0 || high < low+50 {
		t.Errorf("got the first down to %d and the second up to %d, want them apart", low, high)
	}
}
