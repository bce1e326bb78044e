package layouts_test

import (
	"flag"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"drawup/dilution/recheck"
	"drawup/labels"
	"drawup/layouts"
	"drawup/layouts/ink"
)

// Fixtures of the label rules: what each of these labels must look like in the
// standards' and guidelines' own terms. The figures are invented, the classes
// and designs are not.
func TestFixtures(t *testing.T) {
	type design struct{ stripes, bar, line bool }
	base := sample("VAS", "Noradrenaline", "80 micrograms/mL", "4 mg", "C01CA03", "80ug/mL")
	base.As = "base"
	tall := sample("OPI", "fentaNYL", "50 mcg/mL", "500 mcg", "N01AH01", "50ug/mL")
	for _, c := range []struct {
		label labels.Label
		fill  string
		is    design
		says  string
		never string
	}{
		{sample("OPI", "Fentanyl", "50 micrograms/mL", "500 micrograms", "N01AH01", "50ug/mL"), "#71c5e8", design{}, "Fentanyl|50 micrograms/mL|OPIOID", "ANTAGONIST"},
		{tall, "#71c5e8", design{}, "fentaNYL|50 mcg/mL|OPIOID", "Fentanyl"},
		{sample("OPI-A", "Naloxone", "40 micrograms/mL", "400 micrograms", "V03AB15", "40ug/mL"), "#71c5e8", design{stripes: true}, "OPIOID ANTAGONIST", ""},
		{sample("NMB-R", "Sugammadex", "100 mg/mL", "1 g", "V03AB35", "100mg/mL"), "#f9423a", design{stripes: true, line: true}, "REVERSAL", ""},
		{sample("SUX", "Suxamethonium", "50 mg/mL", "100 mg", "M03AB01", "50mg/mL"), "#f9423a", design{bar: true}, "50 mg/mL|RELAXANT", ""},
		{sample("ADR", "Adrenaline", "10 micrograms/mL", "100 micrograms", "C01CA24", "10ug/mL"), "#d6bfdd", design{bar: true}, "10 micrograms/mL|VASOPRESSOR", ""},
		{base, "#d6bfdd", design{}, "80 micrograms/mL|base", ""},
		{sample("HYP", "Glyceryl trinitrate", "1 mg/mL", "50 mg", "C01DA02", "1mg/mL"), "#d6bfdd", design{stripes: true}, "HYPOTENSIVE", "VASOPRESSOR"},
		{sample("HEP", "Heparin", "100 units/mL", "5,000 units", "B01AB01", "100unit/mL"), "", design{}, "100 units/mL", "IU"},
		{sample("OTH", "Dantrolene", "333 micrograms/mL", "20 mg", "M03CA01", "333ug/mL"), "", design{}, "OTHER", "RELAXANT"},
	} {
		pages := placed(t, []labels.Label{c.label}, stock(t, "roll-70x37"), layouts.Options{})
		var got design
		colours := map[string]bool{}
		for _, mark := range pages[0].Marks {
			for _, colour := range coloursOf(mark) {
				if colour != ink.Black && colour != ink.White {
					colours[colour.String()] = true
				}
			}
			switch m := mark.(type) {
			case ink.Polygon:
				got.stripes = true
			case ink.Rect:
				black := m.Fill != nil && *m.Fill == ink.Black
				got.bar = got.bar || black && m.H == ink.MM(37)/2 && m.W == ink.MM(70) && m.Y == 0
				got.line = got.line || black && m.H < 1000 && m.W > ink.MM(50) && m.Y < ink.MM(37)/2
			}
		}
		if got != c.is {
			t.Errorf("%s: got %+v, want %+v", c.label.Name, got, c.is)
		}
		if len(colours) > 1 || c.fill != "" && !colours[c.fill] || c.fill == "" && len(colours) > 0 {
			t.Errorf("%s: got colours %v, want %q only", c.label.Name, colours, c.fill)
		}
		text := words(pages)
		for _, want := range strings.Split(c.says, "|") {
			if !strings.Contains(text, want) {
				t.Errorf("%s: got %q, want %q in it", c.label.Name, text, want)
			}
		}
		if c.never != "" && strings.Contains(text, c.never) {
			t.Errorf("%s: got %q, want no %q", c.label.Name, text, c.never)
		}
	}
}

// The longest names of the formulary, and a mixture on two rows with both
// concentrations, each followed by its drug.
func TestLongNames(t *testing.T) {
	mixture := sample("NMB-R", "Neostigmine", "500 micrograms/mL", "2.5 mg", "N07AA51", "500ug/mL")
	mixture.Second, mixture.SecondConcentration = "glycopyrronium", labels.Cell{Text: "100 micrograms/mL", Figure: recheck.SecondConcentrated}
	text := words(placed(t, []labels.Label{mixture}, stock(t, "a4-24"), layouts.Options{}))
	for _, want := range []string{"Neostigmine with glycopyrronium", "500 micrograms/mL Neostigmine", "100 micrograms/mL glycopyrronium"} {
		if !strings.Contains(text, want) {
			t.Errorf("got %q, want %q", text, want)
		}
	}
	if got := refusedWith(t, mixture, stock(t, "a4-65")); got.Remedy != "use stock a4-24" {
		t.Errorf("got remedy %q", got.Remedy)
	}
	for name, class := range map[string]string{"Magnesium sulfate": "OTH", "Levobupivacaine": "LA", "Dexmedetomidine": "OTH", "Glycopyrronium": "ACH"} {
		l := sample(class, name, "4 micrograms/mL", "200 micrograms", "N05CM18", "4ug/mL")
		for _, s := range []string{"a4-65", "roll-40x15"} {
			if text := words(placed(t, []labels.Label{l}, stock(t, s), layouts.Options{})); !strings.Contains(text, name) {
				t.Errorf("%s: got %q, want %q whole", s, text, name)
			}
		}
	}
}

var update = flag.Bool("update", false, "write the dumps of testdata/ink anew")

// Dumps of a few labels, so that a change of looks is seen in a review. They
// prove nothing by themselves: the other tests measure.
func TestDumps(t *testing.T) {
	list := samples()
	for name, c := range map[string]struct {
		list  []labels.Label
		stock string
		mono  bool
	}{
		"label-opioid-roll-40x15":   {list[6:7], "roll-40x15", false},
		"label-reversal-roll-40x15": {list[5:6], "roll-40x15", false},
		"label-adrenaline-a4-65":    {list[9:10], "a4-65", false},
		"label-relaxant-mono-a4-65": {list[3:4], "a4-65", true},
		"label-infusion-roll-70x37": {[]labels.Label{infusion()}, "roll-70x37", false},
	} {
		var got strings.Builder
		if err := ink.Dump(&got, placed(t, c.list, stock(t, c.stock), layouts.Options{Mono: c.mono})); err != nil {
			t.Fatal(err)
		}
		path := filepath.Join("..", "testdata", "ink", name+".txt")
		if *update {
			if err := os.WriteFile(path, []byte(got.String()), 0o644); err != nil {
				t.Fatal(err)
			}
		}
		want, err := os.ReadFile(path)
		if err != nil {
			t.Fatal(err)
		}
		if got.String() != string(want) {
			t.Errorf("%s looks otherwise; if that is meant, run go test ./layouts -update and look at the difference", path)
		}
	}
}
