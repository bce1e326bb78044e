package quantity

import "testing"

// TestStrengths: sources beside each row. "1 in n" is 1000/n mg/mL.
func TestStrengths(t *testing.T) {
	for _, c := range []struct{ text, want, source string }{
		{"1:1000", "1", "FDA, single-entity injectable drug products: epinephrine 1:1000 is 1 mg/mL"},
		{"1:10,000", "1/10", "FDA, the same: epinephrine 1:10,000 is 0.1 mg/mL"},
		{"1:100,000", "1/100", "ISMP, error-prone dose designations: 0.01 mg/mL"},
		{"1:5000", "1/5", "USP, general chapter 7, May 2016: isoproterenol 1:5000 is 0.2 mg/mL"},
		{"1:50,000", "1/50", "USP, the same: 1:50,000 is 0.02 mg/mL"},
		{"1 in 1,000", "1", "USP, the same: neostigmine 1:1000 is 1 mg/mL"},
		{"1 in 2000", "1/2", "USP, the same: neostigmine 1:2000 is 0.5 mg/mL"},
		{"1:400", "5/2", "USP, the same: neostigmine 1:400 is 2.5 mg/mL"},
		{"1 : 200 000", "1/200", "nursing flashcards, dosage calculations: 1:200,000 is 5 mcg/mL"},
		{"1 in 200\u202f000", "1/200", "the same"},
		{"1 %", "10", "New Zealand intensive-care drug manual, appendix 10: 1 % is 10 mg/mL"},
		{"0.5%", "5", "the same rule: p % is 10 p mg/mL"}, {"2 % w/v", "20", "the same rule"}, {"50 per cent", "500", "the same rule; UK SmPC magnesium sulfate 50 % w/v is 500 mg/mL"},
		{"4 mg in 50 mL", "4/50", "amount over volume, by hand"}, {"400 mg/L", "4/10", "by hand"}, {"5 mg/100 mL", "1/20", "by hand"}, {"1 g/10mL", "100", "by hand"},
		{"0.00005 g/mL", "1/20", "by hand"}, {"2 mg per mL", "2", "by hand"}, {"200 mg\u00a0in\u00a0250 mL", "4/5", "US prescribing information, dopamine: 800 mcg/mL"},
	} {
		got, err := ParseConcentration(c.text)
		if err != nil || got.Rat().Cmp(rat(t, c.want)) != 0 || got.Kind() != ByMass {
			t.Errorf("%q: got %v %v, %v, want %s mg/mL (%s)", c.text, got.Rat(), got.Kind(), err, c.want, c.source)
		}
	}
	for text, kind := range map[string]Kind{"100 units/mL": ByActivity, "1 mmol/mL": BySubstance, "50 units in 50 mL": ByActivity} {
		if c, err := ParseConcentration(text); err != nil || c.Kind() != kind {
			t.Errorf("%q: got %v, %v, want %v", text, c.Kind(), err, kind)
		}
	}
}

// TestRatiosRefused: a ratio that could be read in two ways is not read.
func TestRatiosRefused(t *testing.T) {
	for _, text := range []string{"1:5", "1 in 10", "1:10", "1:99", "1:0", "1:", "1:1", "1:0100", "1:1,5", "1 in 1,5", "1:1,00", "1:1234,567", "1:0,500", "1:10,00", "1:1000.5", "1 in 10.5", "1:x", "1:1000 mL", "1:1,000,0", "1:1234567890", "2:1000", "1:-10", "1:٥٠"} {
		c, err := ParseConcentration(text)
		if fault := faultIn(t, text, err); fault.Code != RatioText || fault.Likely != "" || c.Given() {
			t.Errorf("%q: got %s, likely %q, want %s", text, fault.Code, fault.Likely, RatioText)
		}
	}
	if _, err := ParseConcentration("1 in 5 mL"); faultIn(t, "1 in 5 mL", err).Code != UnknownUnit {
		t.Errorf("1 in 5 mL: got %v, want the unit of the amount missed", err)
	}
}

// TestMix: both halves are kept as they were written.
func TestMix(t *testing.T) {
	a, v, err := ParseMix(" 4 mg  in 50\u00a0mL ")
	if err != nil || a.Exact(Milligram()) != "4" || v.Exact() != "50" || a.Written() != "4 mg" || v.Written() != "50 mL" {
		t.Errorf("got %s in %s, written %q, %q, %v", a.Exact(Milligram()), v.Exact(), a.Written(), v.Written(), err)
	}
	a, v, err = ParseMix("4 mg in 50 cc")
	if err == nil || a.Given() || v.Given() {
		t.Errorf("half a mix: got %v, %v, %v, want neither", a.Given(), v.Given(), err)
	}
	if c, err := ParseConcentration("4 mg in 50 mL"); err != nil || c.Written() != "4 mg in 50 mL" {
		t.Errorf("got written %q, %v", c.Written(), err)
	}
}
