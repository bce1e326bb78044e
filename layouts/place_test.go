package layouts_test

import (
	"fmt"
	"strings"
	"testing"

	"drawup/dilution/recheck"
	"drawup/dilution/refusal"
	"drawup/fonts"
	"drawup/labels"
	"drawup/layouts"
	"drawup/layouts/ink"
)

// Labels stand where the blank ones are, counted along the rows, the used ones
// left out; the renderer's text positions are the judge.
func TestPlaces(t *testing.T) {
	s := stock(t, "a4-65")
	list := make([]labels.Label, 70)
	for i := range list {
		list[i] = samples()[0]
		list[i].Serial.Text = fmt.Sprintf("%08d", i)
	}
	pages := placed(t, list, s, layouts.Options{Used: 7, Foot: []string{"Made by A. Example."}})
	if len(pages) != 2 {
		t.Fatalf("got %d pages for 77 places, want 2", len(pages))
	}
	file := printed(t, pages)
	for page, count := range []int{58, 12} {
		names := 0
		for _, run := range file.Text(page + 1) {
			if strings.TrimSpace(run.Text) != "INDUCTION" {
				continue
			}
			n := names
			if page == 0 {
				n += 7
			}
			// 38.1 x 21.2 mm, 40.6 mm apart, from 4.7 and 10.7 mm; the word
			// begins 1.6 mm from the label's left edge, at its foot.
			x, y := ink.Micrometre(4700+40600*(n%5)+1600), ink.Micrometre(10700+21200*(n/5+1))
			if d := run.StartX - x; d < -60 || d > 60 || run.StartY > y-1000 || run.StartY < y-2000 {
				t.Errorf("page %d, label %d: got %d,%d, want %d and a little above %d", page+1, n, run.StartX, run.StartY, x, y)
			}
			names++
		}
		if names != count {
			t.Errorf("page %d: got %d labels, want %d", page+1, names, count)
		}
		text := strings.ReplaceAll(file.AllText(page+1), "\u00a0", " ") // 100 % stays together
		for _, want := range []string{fmt.Sprintf("sheet %d of 2", page+1), "100 %", "40 mm", "layout after ISO 26825:2020, 5.2 to 5.4", "Made by A. Example.", "a4-65"} {
			if !strings.Contains(text, want) {
				t.Errorf("page %d: found no %q at the edge", page+1, want)
			}
		}
	}
}

// Sheets of 24 give their last label to the sheet's own words; on a roll every
// label is a page.
func TestPages(t *testing.T) {
	list := make([]labels.Label, 24)
	for i := range list {
		list[i] = samples()[i%3]
	}
	if got := len(placed(t, list, stock(t, "a4-24"), layouts.Options{})); got != 2 {
		t.Errorf("got %d sheets for 24 labels, want 2", got)
	}
	if got := len(placed(t, list, stock(t, "roll-70x37"), layouts.Options{Used: 5})); got != 24 {
		t.Errorf("got %d pages, want 24", got)
	}
	if got := len(placed(t, nil, stock(t, "a4-65"), layouts.Options{})); got != 0 {
		t.Errorf("got %d pages for no label", got)
	}
}

// only covers one exact set of figures.
type only map[recheck.Figure]bool

func (o only) Covers(figures []recheck.Figure) bool {
	for _, f := range figures {
		if !o[f] {
			return false
		}
	}
	return o != nil
}

// R17 and "no ink without a second route": a label whose figures have not all
// passed is refused, and nothing is drawn.
func TestNoInkWithoutProof(t *testing.T) {
	l := samples()[0]
	all := only{}
	for _, f := range l.Figures("label") {
		all[f] = true
	}
	changed := l
	changed.Concentration.Text = "20 mg/mL"
	for _, c := range []struct {
		why   string
		label labels.Label
		proof only
		ok    bool
	}{{"all passed", l, all, true}, {"none", l, nil, false}, {"a figure changed afterwards", changed, all, false}} {
		pages, refused := layouts.Labels([]labels.Label{c.label}, stock(t, "a4-65"), []only{c.proof}, layouts.Options{})
		if c.ok != (len(pages) == 1) || c.ok == refused.Refused() {
			t.Errorf("%s: got %d pages, %v", c.why, len(pages), refused)
		}
		if !c.ok && refused[0].Code != refusal.RoutesDisagree {
			t.Errorf("%s: got %s, want %s", c.why, refused[0].Code, refusal.RoutesDisagree)
		}
	}
	// The real proof, never checked; and none at all.
	if _, refused := layouts.Labels([]labels.Label{l}, stock(t, "a4-65"), []recheck.Passed{{}}, layouts.Options{}); !refused.Refused() {
		t.Error("got ink from a zero proof")
	}
	if _, refused := layouts.Labels([]labels.Label{l}, stock(t, "a4-65"), []recheck.Passed{}, layouts.Options{}); !refused.Refused() {
		t.Error("got ink without a proof")
	}
}

// refusedWith places one label and returns what it was refused for.
func refusedWith(t *testing.T, l labels.Label, s layouts.Stock) refusal.Reason {
	t.Helper()
	pages, refused := layouts.Labels([]labels.Label{l}, s, []allPassed{{}}, layouts.Options{})
	if pages != nil || len(refused) != 1 {
		t.Fatalf("%s on %s: got %d pages, %v, want one refusal", l.Name, s.Name, len(pages), refused)
	}
	return refused[0]
}

// R15: what does not fit is refused and the larger stock named. A label of
// 25 x 10 mm leaves a striped design 2.5 mm for the name with its descender.
func TestTooSmall(t *testing.T) {
	small := layouts.Stock{Name: "test-25x10", PageW: ink.MM(25), PageH: ink.MM(10), Columns: 1, Rows: 1, LabelW: ink.MM(25), LabelH: ink.MM(10), DPI: 300, Dots: []int{4}}
	bare := sample("NMB-R", "Sugammadex", "100 mg/mL", "1 g", "V03AB35", "100mg/mL")
	bare.Codes, bare.Prepared = nil, nil
	gtn := sample("HYP", "Glyceryl trinitrate", "1 mg/mL", "50 mg", "C01DA02", "1mg/mL")
	for _, c := range []struct {
		label  labels.Label
		s      layouts.Stock
		larger string
	}{
		{bare, small, "use stock roll-40x15"},
		{gtn, stock(t, "a4-65"), "use stock a4-24"},
		{infusion(), stock(t, "roll-40x15"), "use stock a4-24"},
		{infusion(), stock(t, "a4-65"), "use stock a4-24"},
	} {
		got := refusedWith(t, c.label, c.s)
		if got.Code != refusal.LabelTooSmall || got.Remedy != c.larger || got.Rule != "R15" || got.Syringe != 1 {
			t.Errorf("%s on %s: got %+v, want %s", c.label.Name, c.s.Name, got, c.larger)
		}
	}
	endless := samples()[0]
	endless.Name = "Abcdefghijklmnopqrstuvwxyzabcdefghijklmnopqrstuvwxyz"
	if got := refusedWith(t, endless, stock(t, "a4-65")); !strings.Contains(got.Remedy, "no larger stock") {
		t.Errorf("got remedy %q for a name that fits nowhere", got.Remedy)
	}
}

// A dose that has no room is left out with a caution, never silently.
func TestDoseLeftOut(t *testing.T) {
	l := sample("OPI-A", "Naloxone", "40 micrograms/mL", "400 micrograms", "V03AB15", "40ug/mL")
	l.Dose = labels.Line{{Text: "dose "}, {Text: "10 mL", Figure: recheck.DoseVolume}, {Text: " = "}, {Text: "400 micrograms", Figure: recheck.DoseDelivered}}
	l.Marks = []string{labels.MarkStarter}
	pages, reasons := layouts.Labels([]labels.Label{l}, stock(t, "a4-65"), []allPassed{{}}, layouts.Options{})
	if len(pages) != 1 || reasons.Refused() || len(reasons) != 1 || reasons[0].Severity != refusal.Caution {
		t.Fatalf("got %d pages, %v, want one page and one caution", len(pages), reasons)
	}
	pages, reasons = layouts.Labels([]labels.Label{l}, stock(t, "a4-24"), []allPassed{{}}, layouts.Options{})
	if len(reasons) != 0 || !strings.Contains(words(pages), "dose 10 mL = 400 micrograms") {
		t.Errorf("got %v on the larger stock, want the dose", reasons)
	}
}

func TestOtherRefusals(t *testing.T) {
	l := samples()[0]
	l.Name = "Etomidate薬"
	if got := refusedWith(t, l, stock(t, "a4-65")); got.Code != refusal.GlyphMissing || !strings.Contains(got.Message, "薬") {
		t.Errorf("got %+v", got)
	}
	l = samples()[0]
	l.Name = "ETOMIDATE"
	if got := refusedWith(t, l, stock(t, "a4-65")); got.Field != "drug name" {
		t.Errorf("got %+v", got)
	}
	for skip, ok := range map[int]bool{-1: false, 0: true, 64: true, 65: false} {
		_, refused := layouts.Labels(samples()[:1], stock(t, "a4-65"), []allPassed{{}}, layouts.Options{Used: skip})
		if refused.Refused() == ok {
			t.Errorf("%d labels used: got %v", skip, refused)
		}
	}
}

// words is all text of the pages, with blanks between.
func words(pages []ink.Page) string {
	var all []string
	for _, p := range pages {
		for _, mark := range p.Marks {
			if text, ok := mark.(ink.Text); ok {
				all = append(all, text.String)
			}
		}
	}
	return strings.Join(all, " ")
}

// infusion is an invented label for a pump syringe.
func infusion() labels.Label {
	l := sample("VAS", "Noradrenaline", "80 micrograms/mL", "4 mg", "C01CA03", "80ug/mL")
	l.As, l.Infusion, l.CheckedBy = "base", true, true
	l.Diluent, l.Route, l.Digest = labels.Words("in glucose 5 %"), "intravenous, central line only", "3f9c21aa"
	l.Marks = []string{labels.MarkStarter, labels.MarkUnverified}
	return l
}

// The field set of infusion labels from hospital and accreditation rules:
// also diluent, route, patient, prepared and checked by, and the pump rate,
// which is left to be written.
func TestInfusionFields(t *testing.T) {
	for _, name := range []string{"a4-24", "roll-70x37"} {
		pages := placed(t, []labels.Label{infusion()}, stock(t, name), layouts.Options{})
		text := words(pages)
		for _, want := range []string{"Noradrenaline", "80 micrograms/mL", "base", "4 mg in 10 mL", "in glucose 5 %", "intravenous, central line only", "use by 01 Dec 2026 19:30",
			"made 01 Dec 2026 07:30 A. Example", "patient", "checked by", "pump rate", "mL/h", "VASOPRESSOR", "00001003", "unapproved data", "unverified figures", "3f9c21aa"} {
			if !strings.Contains(text, want) {
				t.Errorf("%s: found no %q in %q", name, want, text)
			}
		}
		lines := 0
		for _, mark := range pages[0].Marks {
			if l, ok := mark.(ink.Line); ok && l.Width == 120 && l.X2-l.X1 >= 9000 {
				lines++
			}
		}
		if lines != 3 {
			t.Errorf("%s: got %d lines to write on, want 3", name, lines)
		}
	}
	known := infusion()
	known.Patient = "Test Person, 01 Jan 1970, 000"
	if text := words(placed(t, []labels.Label{known}, stock(t, "a4-24"), layouts.Options{})); !strings.Contains(text, "patient "+known.Patient) {
		t.Errorf("got %q, want the patient printed", text)
	}
}

// Whatever is put on a label: every line is there whole, in type of at least
// 1.2 mm (name 2.5, concentration 1.8), inside its panel; no two lines run
// into each other along a row; and none touches the barcode.
func TestNothingCutOrOverlapping(t *testing.T) {
	names := []string{"Neostigmine", "Glyceryl trinitrate", "Magnesium sulfate", "Levobupivacaine", "Dexmedetomidine", "ePHEDrine", "Methylthioninium chloride"}
	concentrations := []string{"2 mg/mL", "80 micrograms/mL", "1,000 units/mL", "0.25 mmol/mL"}
	drawn := map[string]int{}
	for _, s := range layouts.Stocks() {
		for _, class := range labels.Classes() {
			for i, name := range names {
				l := sample(class.Code, name, concentrations[i%len(concentrations)], "200 micrograms", "N01AX07", "2mg/mL")
				switch i % 3 {
				case 1:
					l.Marks = []string{labels.MarkStarter}
				case 2:
					l.Route, l.As = "infiltration only", "base"
				}
				pages, refused := layouts.Labels([]labels.Label{l}, s, []allPassed{{}}, layouts.Options{})
				if refused.Refused() {
					continue
				}
				drawn[s.Name]++
				checkLabel(t, l, s, pages[0])
			}
		}
	}
	for _, s := range layouts.Stocks() {
		if drawn[s.Name] < 17 {
			t.Errorf("%s: got %d labels, want some of every class", s.Name, drawn[s.Name])
		}
	}
}

// checkLabel checks one label on a page of its own.
func checkLabel(t *testing.T, l labels.Label, s layouts.Stock, page ink.Page) {
	t.Helper()
	at := s.Place(0)
	left, right := at.X+s.Inset, at.X+s.LabelW-s.Inset
	top, foot := at.Y+s.Inset, at.Y+s.LabelH-s.Inset
	var texts []ink.Text
	var symbol ink.Symbol
	all := ""
	for _, mark := range page.Marks {
		switch m := mark.(type) {
		case ink.Text:
			if m.X >= left && m.X < right && m.Y > top && m.Y < foot {
				texts = append(texts, m)
				all += m.String + " "
			}
		case ink.Symbol:
			symbol = m
		}
	}
	for _, want := range l.Text()[:len(l.Text())-len(l.Codes)] { // the last are the forms of the barcode
		for _, word := range strings.Fields(want) {
			if !strings.Contains(all, word) {
				t.Errorf("%s %s %s: lost %q of %q", s.Name, l.Class.Code, l.Name, word, want)
			}
		}
	}
	for i, a := range texts {
		face := fonts.Get(fonts.Name(a.Face))
		w := ink.Micrometre(face.Width(a.String, int64(a.Size)))
		_, below := face.Extents(a.String, int64(a.Size))
		least := int64(1200)
		switch {
		case a.String == l.Concentration.Text:
			least = 1800 // 2.0, and 1.8 on labels that would be refused else
		case strings.Contains(l.Name, a.String) && a.String != l.Class.Word:
			least = 2500
		}
		if face.CapHeight(fonts.Hundredths(int64(a.Size))*127/36) < least-2 {
			t.Errorf("%s %s: %q has capitals of %d", s.Name, l.Name, a.String, face.CapHeight(int64(a.Size)))
		}
		if a.X+w > right || a.Y+ink.Micrometre(below) > foot {
			t.Errorf("%s %s %s: %q leaves the label", s.Name, l.Class.Code, l.Name, a.String)
		}
		if a.X+w > symbol.X-symbol.Module && a.Y+ink.Micrometre(below) > symbol.Y-symbol.Module {
			t.Errorf("%s %s %s: %q touches the barcode", s.Name, l.Class.Code, l.Name, a.String)
		}
		for _, b := range texts[i+1:] {
			if a.Y == b.Y && a.X < b.X && a.X+w > b.X-500 {
				t.Errorf("%s %s %s: %q runs into %q", s.Name, l.Class.Code, l.Name, a.String, b.String)
			}
			if d := b.Y - a.Y; a.Y != b.Y && d > -1200 && d < 1200 {
				t.Errorf("%s %s %s: %q and %q are %d apart", s.Name, l.Class.Code, l.Name, a.String, b.String, d)
			}
		}
	}
}
