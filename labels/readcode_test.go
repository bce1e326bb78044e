package labels_test

import (
	"testing"
	"time"

	"drawup/dilution/quantity"
	"drawup/labels"
	"drawup/labels/gs1"
)

var noon = time.Date(2026, 12, 1, 12, 0, 0, 0, time.UTC)

func readCode(t *testing.T, text string) (labels.Coded, []gs1.Fault) {
	t.Helper()
	s, faults := gs1.Scan(text)
	if len(faults) > 0 {
		t.Fatalf("%q: %v", text, faults)
	}
	return labels.ReadCode(s, noon)
}

// The internal form, by the table at the top of code.go; the texts are written
// by hand.
func TestReadLabelCode(t *testing.T) {
	c, faults := readCode(t, "]d291N07AA51\x1d92261201193000001003\x1d932.5mg/mL\x1d942500ug\x1d957a83c0d1\x1d96500ug/mL")
	if len(faults) > 0 || c.Kind != labels.KindLabel || c.ATC != "N07AA51" || c.Serial != "00001003" || c.Formulary != "7a83c0d1" || c.WholeDay {
		t.Errorf("got %+v, %v", c, faults)
	}
	if got := c.UseBy.Format("2006-01-02 15:04"); got != "2026-12-01 19:30" {
		t.Errorf("got use-by %s", got)
	}
	if c.Concentration.Exact(quantity.Milligram()) != "2.5" || c.Second.Exact(quantity.Microgram()) != "500" || c.Amount.Exact(quantity.Milligram()) != "2.5" {
		t.Errorf("got %v, %v, %v", c.Concentration, c.Second, c.Amount)
	}
	for unit, want := range map[string]string{"100unit/mL": "100 units/mL", "80ug/mL": "80 micrograms/mL", "500ng/mL": "500 nanograms/mL", "2mmol/mL": "2 mmol/mL", "500umol/mL": "0.5 mmol/mL"} {
		c, faults = readCode(t, "(91)N01AX07(92)261201193000001003(93)"+unit)
		if got := quantity.UK().Concentration(c.Concentration); len(faults) > 0 || got != want {
			t.Errorf("%s: got %q, %v, want %q", unit, got, faults, want)
		}
	}
}

// Packs: batch and serial; a day lasts to its end, day 00 is the last of the
// month (GS1 General Specifications), 7003 has a time.
func TestReadPackCode(t *testing.T) {
	const number = "(01)12345678901231"
	for text, want := range map[string]string{
		"(17)261231": "2026-12-31 23:59", "(17)270200": "2027-02-28 23:59", "(17)280200": "2028-02-29 23:59", "(17)991231": "1999-12-31 23:59",
		"(17)761231": "2076-12-31 23:59", "(7003)2612011930": "2026-12-01 19:30", "(17)261231(7003)2612011930": "2026-12-01 19:30",
	} {
		c, faults := readCode(t, number+text+"(10)A-1(21)7")
		if got := c.UseBy.Format("2006-01-02 15:04"); len(faults) > 0 || c.Kind != labels.KindProduct || got != want || c.Batch != "A-1" || c.Serial != "7" || c.Number != "12345678901231" {
			t.Errorf("%s: got %s, %+v, %v, want %s", text, got, c, faults, want)
		}
	}
	// What another company keeps under 91 is not taken for a drug.
	c, faults := readCode(t, number+"(91)W7")
	if len(faults) > 0 || c.ATC != "" || !c.UseBy.IsZero() {
		t.Errorf("got %+v, %v", c, faults)
	}
	c, _ = readCode(t, number+"(91)C01CA26(93)3mg/mL(94)30mg")
	if c.ATC != "C01CA26" || !c.Amount.Given() {
		t.Errorf("got %+v, want the drug of a label with a site's own number", c)
	}
	if c, faults = readCode(t, "(00)123456789012345675"); c.Kind != labels.KindOther || len(faults) > 0 {
		t.Errorf("got %+v, %v", c, faults)
	}
}

// Values that no label of this tool holds, and separators that went missing.
func TestReadCodeFaults(t *testing.T) {
	for _, c := range []struct {
		text string
		kind gs1.Kind
		at   int
	}{
		{"(91)N01AX7(92)261201193000001003(93)2mg/mL", gs1.Content, 5},
		{"(91)n01ax07(92)261201193000001003(93)2mg/mL", gs1.Content, 5},
		{"(91)N01AX07(92)26120119300000100(93)2mg/mL", gs1.Content, 16},
		{"(91)N01AX07(92)261301193000001003(93)2mg/mL", gs1.Content, 16},
		{"(91)N01AX07(92)261201193000001003(93)2MG/ML", gs1.Content, 38},
		{"(91)N01AX07(92)261201193000001003(93)2mg", gs1.Content, 38},
		{"(91)N01AX07(92)261201193000001003", gs1.Content, 2},
		{"(91)N01AX07(93)2mg/mL", gs1.Content, 2},
		{"91N01AX0792261201193000001003932mg/mL", gs1.Lost, 10},
		{"91N01AX07<GS>92261201193000001003932mg/mL", gs1.Lost, 34},
		{"(91)N01AX07(92)261201193000001003(93)2mg/mL9420mg", gs1.Lost, 44},
	} {
		_, faults := readCode(t, c.text)
		if len(faults) == 0 || faults[0].Kind != c.kind || faults[0].At != c.at {
			t.Errorf("%s: got %+v, want kind %d at %d", c.text, faults, c.kind, c.at)
		}
	}
}

// Nothing that reads as element strings makes the reader of labels panic, and
// what it takes for a label of ours has all that such a label has.
func FuzzReadCode(f *testing.F) {
	for _, seed := range []string{
		"(91)N01AX07(92)261201193000001003(93)2mg/mL(94)20mg(95)7a83c0d1(96)1mg/mL", "(01)12345678901231(17)270200(10)A(21)B",
		"(01)12345678901231(7003)2612011930(91)C01CA26", "91N01AX0792261201193000001003932mg/mL", "(92)1", "(00)123456789012345675",
	} {
		f.Add(seed)
	}
	f.Fuzz(func(t *testing.T, text string) {
		s, faults := gs1.Scan(text)
		if len(faults) > 0 {
			return
		}
		c, faults := labels.ReadCode(s, noon)
		if len(faults) > 0 {
			return
		}
		if c.Kind == labels.KindLabel && (len(c.ATC) != 7 || len(c.Serial) != 8 || c.UseBy.IsZero() || !c.Concentration.Given()) {
			t.Errorf("%q: got %+v without a fault", text, c)
		}
	})
}
