package layouts_test

import (
	"reflect"
	"slices"
	"strings"
	"testing"

	"drawup/dilution/recheck"
	"drawup/fonts"
	"drawup/labels"
	"drawup/layouts"
	"drawup/layouts/ink"
)

// full is a sample with all that the starter formulary makes a label carry,
// with a digest of the widest letters, digits.
func full(l labels.Label) labels.Label {
	l.Marks, l.Digest, l.Dose = []string{labels.MarkStarter, labels.MarkUnverified}, "70836235", labels.Words("one dose")
	return l
}

// textsOf is the type of one label on a page of its own.
func textsOf(t *testing.T, l labels.Label, s layouts.Stock) []ink.Text {
	t.Helper()
	var out []ink.Text
	p := s.Place(0)
	for _, mark := range placed(t, []labels.Label{l}, s, layouts.Options{})[0].Marks {
		if m, ok := mark.(ink.Text); ok && m.Y > p.Y+s.Inset && m.Y < p.Y+s.LabelH && m.X < p.X+s.LabelW {
			out = append(out, m)
		}
	}
	return out
}

// One grid for a stock, our own choice of looks: names begin at one place on
// one baseline and have few sizes; on striped labels they stand in the middle
// between the legs. Nothing stands above a name but right-aligned words about
// the making, and nothing between name and concentration.
func TestGrid(t *testing.T) {
	s := stock(t, "a4-65")
	mid, left := s.Top+s.LabelH/2, s.Left+s.Inset+600
	sizes := map[ink.Micrometre]int{}
	bases := map[ink.Micrometre]int{}
	for _, l := range samples() {
		if strings.HasSuffix(l.Class.Code, "-A") {
			continue // their class words leave no room for two marks
		}
		texts := textsOf(t, full(l), s)
		at := slices.IndexFunc(texts, func(m ink.Text) bool { return m.String == l.Name })
		name := texts[at]
		face := fonts.Get(fonts.Name(name.Face))
		width := ink.Micrometre(face.Width(name.String, int64(name.Size)))
		if l.Class.Stripes {
			if off := 2*name.X + width - 2*s.Left - s.LabelW; off < -2 || off > 2 {
				t.Errorf("%s: got the name %d off the middle", l.Name, off/2)
			}
		} else {
			bases[name.Y]++
			if name.X != left {
				t.Errorf("%s: got the name at %d, want %d", l.Name, name.X, left)
			}
		}
		sizes[ink.Micrometre(face.CapHeight(int64(name.Size)))/10]++
		for i, m := range texts {
			if i == at || m.Y > mid {
				continue
			}
			w := ink.Micrometre(fonts.Get(fonts.Name(m.Face)).Width(m.String, int64(m.Size)))
			high, _ := face.Extents(name.String, int64(name.Size))
			if l.Class.Stripes || m.Y > name.Y-ink.Micrometre(high) || m.X+w < s.Left+s.Inset {
				t.Errorf("%s: got %q in the upper half", l.Name, m.String)
			}
			if !slices.Contains([]string{labels.MarkStarter, labels.MarkUnverified, "ref 70836235"}, m.String) {
				t.Errorf("%s: got %q above the name", l.Name, m.String)
			}
		}
	}
	if len(sizes) > 4 || len(bases) != 1 {
		t.Errorf("got names of %d sizes on %d baselines, want at most 4 on 1", len(sizes), len(bases))
	}
}

// Under the name, from top to bottom: concentration, use-by, who made it and
// when, class word; the amount no higher than the concentration and above the
// use-by; rows equally far apart; the last clear of the edge by 0.8 mm.
func TestRowOrder(t *testing.T) {
	s := stock(t, "a4-65")
	for _, l := range samples() {
		if strings.HasSuffix(l.Class.Code, "-A") {
			continue
		}
		texts := textsOf(t, full(l), s)
		y := func(text string) ink.Micrometre {
			at := slices.IndexFunc(texts, func(m ink.Text) bool { return m.String == text })
			if at < 0 {
				t.Fatalf("%s: found no %q", l.Name, text)
			}
			return texts[at].Y
		}
		rows := []ink.Micrometre{y(l.Concentration.Text), y(l.UseBy.Text()), y(l.Prepared.Text()), y(l.Class.Word)}
		if !slices.IsSorted(rows) || y(l.Amount.Text()) < rows[0] || y(l.Amount.Text()) >= rows[1] || y("one dose") < rows[0] || y("one dose") > rows[2] {
			t.Errorf("%s: got rows at %v, amount at %d", l.Name, rows, y(l.Amount.Text()))
		}
		if low := s.Top + s.LabelH - s.Inset - 800; rows[3] != low || y(l.Serial.Text) > low {
			t.Errorf("%s: got the last row at %d, want %d", l.Name, rows[3], low)
		}
		var small []ink.Micrometre
		for _, m := range texts {
			if m.Y > rows[0] {
				small = append(small, m.Y)
			}
		}
		slices.Sort(small)
		small = slices.Compact(small)
		for i := 2; i < len(small); i++ {
			if small[i]-small[i-1] != small[1]-small[0] {
				t.Errorf("%s: got rows at %v, want them equally far apart", l.Name, small)
			}
		}
	}
}

// The concentration stays clear of the black bar above it: 0.12 mm and more.
func TestClearOfBar(t *testing.T) {
	s := stock(t, "a4-65")
	for _, l := range samples() {
		if !l.Class.Bar {
			continue
		}
		for _, m := range textsOf(t, full(l), s) {
			high, _ := fonts.Get(fonts.Name(m.Face)).Extents(m.String, int64(m.Size))
			if gap := m.Y - ink.Micrometre(high) - s.Top - s.LabelH/2; m.String == l.Concentration.Text && gap < 120 {
				t.Errorf("%s: got the concentration %d below the bar", l.Name, gap)
			}
		}
	}
}

// The naloxone of the demonstration, with dose, mark and digest, keeps every
// line on the sheet of 65, with the concentration in condensed type.
func TestNaloxoneFits(t *testing.T) {
	l := sample("OPI-A", "Naloxone", "400 micrograms/mL", "140 micrograms", "V03AB15", "400ug/mL")
	l.Amount = labels.Line{{Text: "140 micrograms", Figure: recheck.AmountInSyringe}, {Text: " in "}, {Text: "0.35 mL", Figure: recheck.FinalVolume}}
	l.Prepared[2].Text = " A. Sample"
	l.Marks, l.Digest, l.Dose = []string{labels.MarkStarter}, "71bff7a2", labels.Words("one dose")
	s := stock(t, "a4-65")
	pages := placed(t, []labels.Label{l}, s, layouts.Options{})
	l.Digest = "ref " + l.Digest
	checkLabel(t, l, s, pages[0])
	if text := words(pages); !strings.Contains(text, "one dose") {
		t.Errorf("got %q, want the dose", text)
	}
}

// A label looks the same whether it is arranged by itself or after another
// that it shares the arrangement with: one that differs in serial number and
// barcode, and one that differs in figures.
func TestArrangedOnceOrAnew(t *testing.T) {
	for _, name := range []string{"a4-65", "a4-24", "roll-40x15"} {
		s := stock(t, name)
		for _, l := range samples() {
			if name == "roll-40x15" && strings.HasSuffix(l.Class.Code, "-A") {
				continue // too small for these class words
			}
			l.Dose = nil
			for _, change := range []func(*labels.Label){
				func(l *labels.Label) {},
				func(l *labels.Label) {
					l.UseBy = labels.Line{l.UseBy[0], {Text: "27 Dec 2026 08:45", Figure: recheck.UseBy}}
				},
				func(l *labels.Label) { l.Name, l.Concentration.Text = "Lidocaine", "7 mg/mL" },
			} {
				other := l
				other.Serial.Text = "00002718"
				other.Codes = numbered(other)
				change(&other)
				both := placed(t, []labels.Label{l, other}, s, layouts.Options{})
				alone := placed(t, []labels.Label{other}, s, layouts.Options{Used: 1})
				got, want := both[len(both)-1].Marks, alone[len(alone)-1].Marks
				if len(got) < len(want) {
					t.Fatalf("%s %s: got %d marks, want %d or more", name, l.Name, len(got), len(want))
				}
				// The sheet's own marks come first, the last label's last.
				n := marksOf(t, other, s)
				own := len(want) - n
				got = append(got[:own:own], got[len(got)-n:]...)
				if !reflect.DeepEqual(got, want) {
					t.Errorf("%s %s: looks otherwise after another label", name, other.Name)
				}
			}
		}
	}
}

// marksOf counts the marks of one label, without those of its sheet.
func marksOf(t *testing.T, l labels.Label, s layouts.Stock) int {
	one, both := placed(t, []labels.Label{l}, s, layouts.Options{}), placed(t, []labels.Label{l, l}, s, layouts.Options{})
	if s.Roll() {
		return len(one[0].Marks)
	}
	return len(both[0].Marks) - len(one[0].Marks)
}
