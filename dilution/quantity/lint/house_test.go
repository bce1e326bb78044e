package lint_test

import (
	"strings"
	"testing"

	"drawup/dilution/quantity/lint"
)

// A site picks one house style, and what the sources disagree on goes by it:
// the profiles of the label rules. Each line: text, the codes that uk, us and
// si find in it.
func TestHousesSettleContradictions(t *testing.T) {
	for text, want := range map[string][3]string{
		"50 micrograms/mL":  {"", "", ""},          // in full is on no list of errors
		"50 mcg/mL":         {"N06", "", "N06"},    // in full (British National Formulary, WHO), mcg (lists of the United States)
		"50 \u00b5g/mL":     {"N06", "N06", "N06"}, // customary in SI countries; no site can ask for it here
		"50 \u03bcg/mL":     {"N06", "N06", "N06"}, // the other code point
		"5 nanograms":       {"", "", ""},          // in full since 2024
		"10,000 units":      {"", "", "N09"},       // comma (Institute for Safe Medication Practices), blank (SI)
		"10\u00a0000 units": {"", "N09", ""},       // the house's own blank
		"10\u202f000 units": {"", "N09", ""},       // the thin one
		"10000 units":       {"N09", "N09", "N09"}, // nothing at all
		"1,5 mg":            {"N09", "N09", "N09"}, // ISO writes the decimal comma; no house here does
		"100 IU/mL":         {"N05", "N05", "N05"}, // units, for international ones too
		"100 units/mL":      {"", "", ""},          //
		"5 ml":              {"N07", "N07", "N07"}, // in SI countries it passes: told there, not stopped
		"lidocaine 2 %":     {"N13", "N13", "N13"}, //
		"20 mg/mL (2 %)":    {"", "", ""},          // in brackets in all of them
		"adrenaline 1:1000": {"N08", "N08", "N08"}, // still on ampoules of the United Kingdom, dropped from print
		"01 Dec 2026 19:30": {"", "", ""},          // one reading
		"2026-12-01 19:30":  {"", "", ""},          //
		"1/12/2026":         {"N25", "N25", "N25"}, //
		"with adrenaline 5 micrograms/mL (1 in 200,000), lidocaine 10 mg/mL": {"", "", ""},
	} {
		for i, h := range lint.Houses() {
			if got := codes(h.Typed(text)); got != want[i] {
				t.Errorf("%s %q: got %q, want %q", h, text, got, want[i])
			}
		}
	}
	ml := lint.SI().Typed("5 ml")
	if len(ml) != 1 || ml[0].Severity != lint.Warn {
		t.Errorf("si, ml: got %v, want a warning", ml)
	}
	if _, ok := lint.Named("metric"); ok || lint.UK().String() != "uk" {
		t.Error("got a house of no name, want uk, us, si only")
	}
}

// The five texts of the acceptance list, each with its one code.
func TestFiveErrors(t *testing.T) {
	for text, want := range map[string]string{"1.0 mg": "N01", ".5 mL": "N02", "10mg": "N03", "5 cc": "N07", "50 U": "N05"} {
		for _, h := range lint.Houses() {
			found := h.Printed(text)
			if codes(found) != want || found[0].Severity != lint.Stop {
				t.Errorf("%s %q: got %v, want %s as a stop", h, text, found, want)
			}
		}
	}
}

// Fixes that are certain, by the right column of the lists; where two readings
// are left there is none. The ratios are those of the US Pharmacopeia, general
// chapter 7: 1 in n is 1000/n mg/mL.
func TestFixes(t *testing.T) {
	for text, want := range map[string][3]string{
		"1.0 mg":                    {"1 mg"},
		".5 mg":                     {"0.5 mg"},
		"lidocaine20 mg/mL":         {"lidocaine 20 mg/mL"},
		"10mg of it":                {"10 mg of it"},
		"50 U and 1 IU":             {"50 units and 1 unit"},
		"50 \u00b5g/mL":             {"50 micrograms/mL", "50 mcg/mL", "50 micrograms/mL"},
		"1 ug":                      {"1 microgram", "1 mcg", "1 microgram"},
		"10 ng/kg/min":              {"10 nanograms/kg/min"},
		"5 cc":                      {"5 mL"},
		"adrenaline 1:1000":         {"adrenaline 1 mg/mL"},
		"adrenaline 1 in 10,000":    {"adrenaline 100 micrograms/mL", "adrenaline 100 mcg/mL", "adrenaline 100 micrograms/mL"},
		"1:100,000":                 {"10 micrograms/mL", "10 mcg/mL", "10 micrograms/mL"},
		"isoprenaline 1:5000":       {"isoprenaline 200 micrograms/mL", "isoprenaline 200 mcg/mL", "isoprenaline 200 micrograms/mL"},
		"neostigmine 1:400":         {"neostigmine 2.5 mg/mL"},
		"1000000 units":             {"1,000,000 units", "1,000,000 units", "1\u00a0000\u00a0000 units"},
		"10 mg. in":                 {"10 mg in"},
		"5 mL/hr":                   {"5 mL/h"},
		"KCl 20 mmol":               {"potassium chloride 20 mmol"},
		"EPI given":                 {"adrenaline given", "epinephrine given", "adrenaline given"},
		"5 K units":                 {"5,000 units", "5,000 units", "5\u00a0000 units"},
		"mg 5":                      {"5 mg"},
		"1 g 500 mg":                {"1.5 g"},
		"25 units/50 mL":            {"25 units in 50 mL"},
		"V mg":                      {"5 mg"},
		"1/2 mL":                    {"0.5 mL"},
		"31/12/2026 at 7:30 pm":     {"31 Dec 2026 at 19:30", "2026-12-31 at 19:30", "2026-12-31 at 19:30"},
		"fentanyl & midazolam":      {"fentanyl and midazolam"},
		"give 2.50mg of it in 5 cc": {"give 2.5 mg of it in 5 mL"},
	} {
		for i, h := range lint.Houses() {
			wanted := want[i]
			if wanted == "" {
				wanted = want[0]
			}
			if got, whole := h.Fixed(text); got != wanted || !whole {
				t.Errorf("%s %q: got %q, nothing left %v, want %q", h, text, got, whole, wanted)
			}
		}
	}
}

// A better unit is told, not put in: what was typed keeps its unit. What has two
// readings has no fix at all.
func TestWhatIsNotPutIn(t *testing.T) {
	for text, want := range map[string][2]string{
		"0.05 mg/mL":   {"50 micrograms", "50 mcg"},
		"0.00005 g/mL": {"50 micrograms", "50 mcg"},
		"0.1 mg/mL":    {"100 micrograms", "100 mcg"},
		"0.16 mg/mL":   {"160 micrograms", "160 mcg"},
		"0.5 g":        {"500 mg", "500 mg"},
	} {
		for i, h := range []lint.House{lint.UK(), lint.US()} {
			found := h.Typed(text)
			if len(found) == 0 || found[0].Rule.Code != "N16" || found[0].Fix != want[i] {
				t.Errorf("%s %q: got %+v, want %q", h, text, found, want[i])
			}
			if got, _ := h.Fixed(text); got != text {
				t.Errorf("%s %q: got %q, want it as typed", h, text, got)
			}
		}
	}
	for _, text := range []string{"03/04/2025", "MS 10 mg", "5 mil", "1,5 mg", "lidocaine 2 %", "2 MU", "5 \u00b5L"} {
		if got, whole := lint.UK().Fixed(text); got != text || whole {
			t.Errorf("%q: got %q, want no fix: it has two readings", text, got)
		}
	}
}

// What must not be stopped: sentences of ordinary papers.
func TestLetsOrdinaryWordsPass(t *testing.T) {
	for _, text := range []string{
		"", "Harbour Theatre 2 (invented)", "A. Sample", "HM-01", "bed scale, 30 Nov 2026", "use by 01 Dec 2026 19:30", "2026-12-01 07:30",
		"Draw up 5 mL. Then mix.", "draw 7.2 mL, make up to 20 mL", "1,500 mL/h", "in glucose 5 %", "plus or minus 10 %", "0.7 % less",
		"page 2 of 5", "ISO 26825:2020, 5.2 to 5.4", "source 12", "1 of 2 ampoules", "IV 5 mg", "C. Ng", "BMI 46", "3rd dose in 24 h",
		"12 h", "07:30", "CYP2D6", "occurs in 1 in 10,000 patients", "EPINEPHrine", "Ms Example", "Dr. M. Neo", "5 million units",
	} {
		for _, h := range lint.Houses() {
			if found := h.Typed(text); len(found) > 0 && !(h == lint.SI() && strings.Contains(text, ",")) {
				t.Errorf("%s stops %q: %v", h, text, codes(found))
			}
		}
	}
}

func TestGrouped(t *testing.T) {
	for text, want := range map[string][2]string{
		"ampoule 25000 units in 5 mL":                {"ampoule 25,000 units in 5 mL", "ampoule 25\u00a0000 units in 5 mL"},
		"1,000, 5,000 and 25,000 units/mL":           {"1,000, 5,000 and 25,000 units/mL", "1\u00a0000, 5\u00a0000 and 25\u00a0000 units/mL"},
		"5\u00a0000 units":                           {"5,000 units", "5\u00a0000 units"},
		"1234.5 mL, not 12345":                       {"1,234.5 mL, not 12345", "1\u00a0234.5 mL, not 12345"},
		"0.0405 mg on 2026-12-01, syringes 3,7 of 9": {"0.0405 mg on 2026-12-01, syringes 3,7 of 9", "0.0405 mg on 2026-12-01, syringes 3,7 of 9"},
		"5000\u00a0units":                            {"5,000\u00a0units", "5\u00a0000\u00a0units"},
	} {
		for i, h := range []lint.House{lint.UK(), lint.SI()} {
			if got := h.Grouped(text); got != want[i] {
				t.Errorf("%s %q: got %q, want %q", h, text, got, want[i])
			}
		}
	}
}

// A number and its unit stay on one line (rule N26).
func TestGlue(t *testing.T) {
	for text, want := range map[string]string{
		"draw 7.2 mL, then 5 mg/mL":   "draw 7.2\u00a0mL, then 5\u00a0mg/mL",
		"2 of 5 mL (24 h)":            "2 of 5\u00a0mL (24\u00a0h)",
		"glucose 5 % from ampoule 3.": "glucose 5\u00a0% from ampoule 3.",
		"":                            "",
	} {
		if got := lint.Glue(text); got != want {
			t.Errorf("%q: got %q, want %q", text, got, want)
		}
	}
}

// FuzzFixed wants of any text: places inside it, fixes that do not bring back
// what they mended, and no end to the work.
func FuzzFixed(f *testing.F) {
	for _, r := range lint.Rules() {
		for _, text := range append(r.Wrong, r.Right...) {
			f.Add(text)
		}
	}
	f.Fuzz(func(t *testing.T, text string) {
		for _, h := range lint.Houses() {
			for _, x := range h.Typed(text) {
				if x.Got == "" || text[x.At:x.At+len(x.Got)] != x.Got || x.Severity == 0 {
					t.Fatalf("%s %q: got %+v, want a place in the text", h, text, x)
				}
			}
			h.Whole(text, strings.Split(text, "|"))
			h.Grouped(lint.Glue(text))
			fixed := text
			for range 8 {
				next, _ := h.Fixed(fixed)
				if next == fixed {
					break
				}
				fixed = next
			}
		}
	})
}
