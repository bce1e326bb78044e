package quantity

import (
	"slices"
	"strings"
	"testing"
)

// TestUnitsAccepted: every spelling that the manual lists for input. The
// factors are those of the SI (SI Brochure, table of prefixes), of the day of
// 24 hours and of the litre of 1000 mL.
func TestUnitsAccepted(t *testing.T) {
	amounts := map[string]string{
		"g": "1000", "mg": "1", "mcg": "1/1000", "\u00b5g": "1/1000", "\u03bcg": "1/1000", "microgram": "1/1000", "micrograms": "1/1000",
		"ng": "1/1000000", "nanogram": "1/1000000", "nanograms": "1/1000000", "units": "1", "unit": "1", "milliunits": "1/1000",
		"mmol": "1", "micromol": "1/1000", "\u00b5mol": "1/1000",
	}
	periods := map[string]string{"min": "60", "h": "1", "hr": "1", "hour": "1", "day": "1/24"}
	for unit, scale := range amounts {
		a, err := ParseAmount("3 " + unit)
		want := mulRat(rat(t, "3"), rat(t, scale))
		if err != nil || a.Rat().Cmp(want) != 0 {
			t.Errorf("3 %s: got %v, %v, want %v", unit, a.Rat(), err, want)
		}
		for period, perHour := range periods {
			for basis, b := range map[string]Basis{"": Absolute, "/kg": PerKilogram, "/m2": PerSquareMetre, "/m²": PerSquareMetre} {
				text := "3 " + unit + basis + "/" + period
				d, err := ParseDoseRate(text)
				if want := mulRat(want, rat(t, perHour)); err != nil || d.Rat().Cmp(want) != 0 || d.Basis() != b {
					t.Errorf("%s: got %v %v, %v, want %v %v", text, d.Rat(), d.Basis(), err, want, b)
				}
			}
		}
	}
	for text, want := range map[string]string{"50 mL": "50", "50 ml": "50", "0.5 L": "500", "50mL": "50"} {
		if v, err := ParseVolume(text); err != nil || v.Rat().Cmp(rat(t, want)) != 0 {
			t.Errorf("%s: got %v, %v, want %s mL", text, v.Rat(), err, want)
		}
	}
	for text, want := range map[string]string{"5 mL/h": "5", "5 ml/hr": "5", "0.5 mL/min": "30", "1.2 L/day": "50", "5 mL / hour": "5", "5 mL per hour": "5"} {
		if f, err := ParseFlowRate(text); err != nil || f.Rat().Cmp(rat(t, want)) != 0 {
			t.Errorf("%s: got %v, %v, want %s mL/h", text, f.Rat(), err, want)
		}
	}
	for text, want := range map[string]string{"178 cm": "178", "1.78 m": "178"} {
		if l, err := ParseLength(text); err != nil || l.Rat().Cmp(rat(t, want)) != 0 {
			t.Errorf("%s: got %v, %v, want %s cm", text, l.Rat(), err, want)
		}
	}
	for text, want := range map[string]string{"10 %": "10", "10%": "10", "0 %": "0", "2.5 per cent": "5/2"} {
		if p, err := ParsePercent(text); err != nil || p.Rat().Cmp(rat(t, want)) != 0 {
			t.Errorf("%s: got %v, %v, want %s %%", text, p.Rat(), err, want)
		}
	}
	if d, err := ParseDoseRate("0.1 microgram per kg per min"); err != nil || d.Exact() != "0.1" || d.Basis() != PerKilogram || d.Period() != PerMinute {
		t.Errorf("in words: got %s %v, %v", d.Exact(), d.Basis(), err)
	}
}

// A sort is one parser, as a test calls it.
type sort struct {
	name  string
	parse func(string) error
}

func sorts() []sort {
	return []sort{
		{"amount", func(s string) error { _, err := ParseAmount(s); return err }},
		{"volume", func(s string) error { _, err := ParseVolume(s); return err }},
		{"concentration", func(s string) error { _, err := ParseConcentration(s); return err }},
		{"mix", func(s string) error { _, _, err := ParseMix(s); return err }},
		{"dose", func(s string) error { _, err := ParseDose(s); return err }},
		{"dose rate", func(s string) error { _, err := ParseDoseRate(s); return err }},
		{"flow rate", func(s string) error { _, err := ParseFlowRate(s); return err }},
		{"weight", func(s string) error { _, err := ParseBodyWeight(s); return err }},
		{"height", func(s string) error { _, err := ParseLength(s); return err }},
		{"surface", func(s string) error { _, err := ParseSurface(s); return err }},
		{"percent", func(s string) error { _, err := ParsePercent(s); return err }},
	}
}

func sortNamed(t testing.TB, name string) sort {
	t.Helper()
	for _, s := range sorts() {
		if s.name == name {
			return s
		}
	}
	t.Fatalf("no parser for %q", name)
	return sort{}
}

// TestUnitsRefused: the spellings that the ISMP list of error-prone
// abbreviations and the Joint Commission "Do Not Use" list name (U, IU, cc, ug)
// and slips of the pen. A unit that is read elsewhere is of the wrong kind.
func TestUnitsRefused(t *testing.T) {
	for _, c := range []struct {
		sort, text string
		code       Fault
		likely     string
	}{
		{"amount", "50 U", UnknownUnit, "50 units"}, {"amount", "50 u", UnknownUnit, "50 units"}, {"amount", "50 IU", UnknownUnit, "50 units"},
		{"amount", "50.0 I.U.", UnknownUnit, "50 units"}, {"amount", "50 ug", UnknownUnit, "50 microgram"}, {"amount", "50 gamma", UnknownUnit, "50 microgram"},
		{"amount", "5 mgs", UnknownUnit, "5 mg"}, {"amount", "5 mg.", UnknownUnit, "5 mg"}, {"amount", "5 MG", UnknownUnit, "5 mg"}, {"amount", "5 gm", UnknownUnit, "5 g"},
		{"amount", "5 mEq", UnknownUnit, ""}, {"amount", "5 K units", UnknownUnit, ""}, {"amount", "5", UnknownUnit, ""}, {"amount", "5 /", UnknownUnit, ""}, {"amount", "5 //", UnknownUnit, ""},
		{"amount", "5 grain", UnknownUnit, ""}, {"amount", "5 mg extra", UnknownUnit, ""}, {"amount", "1:1000", RatioText, ""}, {"amount", "1 g 500 mg", UnknownUnit, ""},
		{"amount", "5 mg/mL", WrongUnit, ""}, {"amount", "5 mg/kg", WrongUnit, ""}, {"amount", "5 mL", WrongUnit, ""}, {"amount", "5 kg", WrongUnit, ""}, {"amount", "5 %", WrongUnit, ""},
		{"volume", "5 cc", UnknownUnit, "5 mL"}, {"volume", "5 ML", UnknownUnit, "5 mL"}, {"volume", "5 mls", UnknownUnit, "5 mL"}, {"volume", "5 mg", WrongUnit, ""}, {"volume", "5 mL/h", WrongUnit, ""},
		{"volume", "5 mg/foo", UnknownUnit, ""}, {"volume", "5 gtt", UnknownUnit, ""},
		{"dose", "5 mL", WrongUnit, ""}, {"dose", "5 mL/kg", WrongUnit, ""}, {"dose", "5 mg/h", WrongUnit, ""}, {"dose", "5 mg/kg/min", WrongUnit, ""}, {"dose", "5 ug/kg", UnknownUnit, "5 microgram/kg"}, {"dose", "5 mg/Kg", UnknownUnit, "5 mg/kg"}, {"dose", "5 mg/m^2", UnknownUnit, "5 mg/m2"},
		{"dose", "5 mg/lb", WrongUnit, ""}, {"dose", "5 mg/kg/", UnknownUnit, ""}, {"dose", "5 /kg", UnknownUnit, ""}, {"dose", "5", UnknownUnit, ""},
		{"dose rate", "5 mL/h", WrongUnit, ""}, {"dose rate", "5 mg", WrongUnit, ""}, {"dose rate", "0.05 microgram/kg", WrongUnit, ""}, {"dose rate", "5 mg/h/kg", WrongUnit, ""}, {"dose rate", "5 ug/kg/hrs", UnknownUnit, "5 microgram/kg/h"}, {"dose rate", "5 U/hr", UnknownUnit, "5 units/hr"}, {"dose rate", "5 mg/s", UnknownUnit, ""},
		{"flow rate", "5 cc/hr", UnknownUnit, "5 mL/hr"}, {"flow rate", "5 mL/hrs", UnknownUnit, "5 mL/h"}, {"flow rate", "5 mL", WrongUnit, ""}, {"flow rate", "0.1 mg/h", WrongUnit, ""}, {"flow rate", "5 mL/kg/h", WrongUnit, ""},
		{"concentration", "5 mg", WrongUnit, ""}, {"concentration", "5 mL", WrongUnit, ""}, {"concentration", "5 mg/kg", WrongUnit, ""}, {"concentration", "100 IU/mL", UnknownUnit, "100 units/mL"}, {"concentration", "5 mg/cc", UnknownUnit, "5 mg/mL"}, {"concentration", "5 mg/dL", UnknownUnit, ""},
		{"concentration", "5 mg/0 mL", ZeroOrLess, ""}, {"concentration", "5.0 mg/1,000 mL", CommaNumber, "5 mg/1000 mL"}, {"concentration", "5 % v/v", WrongUnit, ""}, {"concentration", "5 % w/w", WrongUnit, ""}, {"concentration", "5 % xyz", WrongUnit, ""}, {"concentration", "0 %", ZeroOrLess, ""},
		{"mix", "4 mg", BadNumber, ""}, {"mix", "4 mg in 50", UnknownUnit, ""}, {"mix", "4.0 mg in 50,0 mL", CommaNumber, "4 mg in 50 mL"}, {"mix", ".5 mg in 50 cc", BadNumber, "0.5 mg in 50 mL"}, {"mix", "4 mL in 50 mL", WrongUnit, ""}, {"mix", "4 mg in 0 mL", ZeroOrLess, ""}, {"mix", "4 mg in 50 mg", WrongUnit, ""}, {"mix", "4 mg in 50 mL in 5 mL", UnknownUnit, ""},
		{"weight", "72 Kg", UnknownUnit, "72 kg"}, {"weight", "72", UnknownUnit, ""}, {"weight", "72 mg", WrongUnit, ""}, {"weight", "72 cm", WrongUnit, ""}, {"weight", "0 kg", ZeroOrLess, ""}, {"weight", "72 lb 4 oz", UnknownUnit, ""},
		{"height", "178 CM", UnknownUnit, "178 cm"}, {"height", "72 kg", WrongUnit, ""}, {"height", "5 ft", UnknownUnit, ""}, {"height", "0 cm", ZeroOrLess, ""},
		{"surface", "1.8", UnknownUnit, ""}, {"surface", "1.8 m", WrongUnit, ""}, {"surface", "1.8 sqm", UnknownUnit, "1.8 m2"}, {"surface", "0 m2", ZeroOrLess, ""},
		{"percent", "10", UnknownUnit, ""}, {"percent", "10 mg", WrongUnit, ""}, {"percent", "10,0 %", CommaNumber, "10 %"}, {"percent", "-10 %", BadNumber, ""},
	} {
		err := sortNamed(t, c.sort).parse(c.text)
		if fault := faultIn(t, c.text, err); fault.Code != c.code || fault.Likely != c.likely {
			t.Errorf("%s %q: got %s, likely %q; want %s, likely %q", c.sort, c.text, fault.Code, fault.Likely, c.code, c.likely)
		}
	}
}

// TestWeightsRefused: the avoirdupois pound is 0.45359237 kg exactly
// (international yard and pound agreement, 1959), the stone 14 pounds. 72 lb
// are 32.65865064 kg; 143 lb are 64.86 kg and 150 lb 68.0388555 kg, as the
// remarks to the published examples A106 and A155 work them; 11 st are
// 69.85322498 kg; 2 lb are 0.90718474 kg.
func TestWeightsRefused(t *testing.T) {
	for text, want := range map[string]string{
		"72 lb": "32.7 kg", "143 lbs": "64.9 kg", "150 pounds": "68 kg", "11 st": "69.9 kg", "11 stone": "69.9 kg", "2 lb": "0.91 kg",
		"3400 g": "3.4 kg", "3445 g": "3.445 kg", "950 g": "0.95 kg", "0 lb": "", "0.001 lb": "",
	} {
		w, err := ParseBodyWeight(text)
		if fault := faultIn(t, text, err); fault.Code != WrongUnit || fault.Likely != want || w.Given() {
			t.Errorf("%s: got %s, likely %q, want %s, %q", text, fault.Code, fault.Likely, WrongUnit, want)
		}
	}
	if w, err := ParseBodyWeight("3.4 kg"); err != nil || w.Exact() != "3.4" {
		t.Errorf("3.4 kg: got %s, %v", w.Exact(), err)
	}
}

// TestMisspelt: every spelling that is mended, where its unit is wanted. The
// first of each row is on the ISMP list of error-prone abbreviations or the
// Joint Commission "Do Not Use" list where it has one; the others are common
// slips, without a source.
func TestMisspelt(t *testing.T) {
	for want, spellings := range map[string][]string{
		"amount 5 units":        {"IU", "U", "iu", "I.U.", "i.u.", "u", "UI", "IE", "Unit", "Units", "UNIT", "UNITS"},
		"volume 5 mL":           {"cc", "ccm", "cm3", "ML", "Ml", "mls", "mLs", "mils", "mL."},
		"amount 5 microgram":    {"ug", "ugm", "mcgm", "mcgs", "Mcg", "MCG", "gamma", "mikrogram"},
		"amount 5 mg":           {"mgs", "mgm", "mgms", "MG", "Mg", "mg."},
		"amount 5 g":            {"gm", "gms", "gs", "G"},
		"amount 5 nanogram":     {"nanog", "ngs", "NG"},
		"amount 5 mmol":         {"mmols", "mMol", "mmoles"},
		"weight 5 kg":           {"kgs", "Kg", "KG", "kilo", "kilos", "kilogram", "kilograms"},
		"flow rate 5 mL/h":      {"mL/hrs", "mL/H", "mL/Hr", "mL/HR", "mL/hours"},
		"flow rate 5 mL/min":    {"mL/minutes", "mL/Min", "mL/MIN"},
		"flow rate 5 mL/day":    {"mL/D", "mL/days", "mL/Day"},
		"surface 5 m2":          {"m^2", "M2", "sqm", "sq m"},
		"height 5 cm":           {"Cm", "CM", "cms", "centimetre", "centimetres"},
		"height 5 m":            {"M", "metre", "metres"},
		"dose rate 5 mg/m2/day": {"MG/m^2/days"},
	} {
		name, text, _ := strings.Cut(want, " 5 ")
		for _, s := range spellings {
			err := sortNamed(t, name).parse("5.0 " + s)
			if fault := faultIn(t, s, err); fault.Code != UnknownUnit || fault.Likely != "5 "+text {
				t.Errorf("%s %q: got %s, likely %q, want %s, %q", name, s, fault.Code, fault.Likely, UnknownUnit, "5 "+text)
			}
		}
	}
	for _, name := range []string{"dose", "dose rate", "flow rate"} {
		text := map[string]string{"dose": "0 mg/kg", "dose rate": "0 mg/h", "flow rate": "0 mL/h"}[name]
		if err := sortNamed(t, name).parse(text); faultIn(t, text, err).Code != ZeroOrLess {
			t.Errorf("%s: got %v, want %s", text, err, ZeroOrLess)
		}
	}
}

// TestWords: what a value was read from, and the names of kinds, bases, periods.
func TestWords(t *testing.T) {
	a, _ := ParseAmount(" 4\u00a0mg ")
	v, _ := ParseVolume("1 L")
	c, _ := ParseConcentration("1:1000")
	d, _ := ParseDose("0.3 mg/kg")
	r, _ := ParseDoseRate("5 units/hr")
	f, _ := ParseFlowRate("5 ml/hr")
	w, _ := ParseBodyWeight("72 kg")
	s, _ := ParseSurface("1.8 m2")
	l, _ := ParseLength("1.78 m")
	p, _ := ParsePercent("10%")
	got := []string{a.Written(), v.Written(), c.Written(), d.Written(), r.Written(), f.Written(), w.Written(), s.Written(), l.Written(), p.Written()}
	want := []string{"4 mg", "1 L", "1:1000", "0.3 mg/kg", "5 units/hr", "5 ml/hr", "72 kg", "1.8 m2", "1.78 m", "10%"}
	if !slices.Equal(got, want) {
		t.Errorf("written: got %q, want %q", got, want)
	}
	got = []string{d.Kind().String(), r.Kind().String(), BySubstance.String(), Kind(0).String(), d.Basis().String(), Absolute.String(), PerSquareMetre.String(), Basis(0).String(),
		r.Period().String(), PerMinute.String(), PerDay.String(), Period(0).String(), r.Unit().String(), Micromole().String(), Unit{}.String()}
	want = []string{"mass", "units", "amount of substance", "nothing", "per kg", "absolute", "per m²", "nothing", "h", "min", "day", "", "unit", "micromol", ""}
	if !slices.Equal(got, want) {
		t.Errorf("names: got %q, want %q", got, want)
	}
}
