package recheck

import (
	"errors"
	"strings"
	"testing"
)

const invented = `
note = """
[[drug]]
name = "alpha"
"""
# [[drug]]
[[drug]]   # first
name = "alpha"
class = { value = "x", source = "y" }
substance = "4 mmol/g"

[[drug.presentation]]
id = "a"
amount = { source = "value = \"99 mg\", more }", value = "20 mg" }
volume = '10 mL' # pack
assay = "10 %"

[[drug.limit]]
id = "a"
amount = "7 mg"

[[drug.presentation]]
id = "b"
amount = "50 mg"
add = "5 mL"
displacement = "negligible"

[[drug]]
name = "beta"
[[drug.presentation]]
id = "a"
amount = "1 g"
`

func TestFindRecord(t *testing.T) {
	// The text between """ is cut at its own [[drug]] line and read as a second
	// alpha: two of one name are refused, never chosen from.
	if r := findRecord([]byte(invented), "alpha", "a"); r.problem == "" {
		t.Error("two drugs named alpha were accepted")
	}
	text := []byte(strings.Replace(invented, "\nname = \"alpha\"\n\"\"\"", "\n\"\"\"", 1))
	want := []struct{ drug, pack, key, text string }{
		{"alpha", "a", "amount", "20 mg"}, {"alpha", "a", "volume", "10 mL"}, {"alpha", "a", "assay", "10 %"},
		{"alpha", "b", "amount", "50 mg"}, {"alpha", "b", "displacement", "negligible"}, {"beta", "a", "amount", "1 g"},
	}
	for _, w := range want {
		r := findRecord(text, w.drug, w.pack)
		if got, problem := r.presentation(w.key); problem != "" || got != w.text {
			t.Errorf("%s %s %s: got %q %q, want %q", w.drug, w.pack, w.key, got, problem, w.text)
		}
	}
	r := findRecord(text, "alpha", "b")
	if _, problem := r.presentation("volume"); problem == "" {
		t.Error("a line of another presentation was taken")
	}
	if got, _ := r.drug("substance"); got != "4 mmol/g" {
		t.Errorf("substance: got %q", got)
	}
	for _, w := range [][2]string{{"gamma", "a"}, {"alpha", "c"}, {"", "a"}, {"alpha", ""}, {"alph", "a"}} {
		if r := findRecord(text, w[0], w[1]); r.problem == "" {
			t.Errorf("%v was found", w)
		}
	}
	twice := strings.Replace(string(text), "volume = '10 mL'", "amount = \"2 mg\"\nvolume = '10 mL'", 1)
	if r := findRecord([]byte(twice), "alpha", "a"); r.problem == "" {
		t.Error("a line that stands twice was accepted")
	}
}

func TestEmptyAndUnknown(t *testing.T) {
	if (Passed{}).Covers(nil) || (Passed{}).Covers([]Figure{}) {
		t.Error("the zero Passed covers something")
	}
	if _, err := Check(Stated{}); err == nil {
		t.Error("a Stated without figures passed")
	}
	s := mixed(t, "4 mg", "50 mL", "40 mL", "80 micrograms/mL", "", "") // GAL-NORA
	passed, err := Check(s)
	if err != nil {
		t.Fatal(err)
	}
	if !passed.Covers(nil) || !passed.Covers(s.Figures[2:4]) {
		t.Error("a passed set does not cover its part")
	}
	for _, f := range []Figure{{"label", Concentration, "80 micrograms/mL"}, {"draw-up", Concentration, "8 micrograms/mL"}, {"draw-up", Strength, "80 micrograms/mL"}} {
		if passed.Covers([]Figure{f}) {
			t.Errorf("%v was never checked, yet is covered", f)
		}
	}
	strange := s
	strange.Figures = append(append([]Figure{}, s.Figures...), Figure{"label", "ladder.0.rate", "1 mL/h"}, Figure{"label", "colour", "blue"})
	disagreesAt(t, "unknown names", strange, "ladder.0.rate", "colour")
	strange = s
	strange.Asked = append(append([]Figure{}, s.Asked...), Figure{Name: "colour", Text: "blue"}, Figure{Name: AmountInSyringe, Text: "5 mg"})
	disagreesAt(t, "asked twice, and unknown", strange, "colour", AmountInSyringe)
}

// All faults are listed, each with what stands on paper and what comes out.
func TestDisagreementWords(t *testing.T) {
	s := mixed(t, "4 mg", "50 mL", "40 mL", "80 micrograms/mL", "", "")
	s = s.with(Concentration, "90 micrograms/mL").with(AmountInSyringe, "4 micrograms").with(ContainerVolume, "1 mL")
	_, err := Check(s)
	var d *Disagreement
	if !errors.As(err, &d) {
		t.Fatalf("got %v", err)
	}
	text := d.Error()
	for _, part := range []string{`concentration prints "90 micrograms/mL"`, `amount prints "4 micrograms"`, `container.volume prints "1 mL", the second route gets 10`, "nothing may be printed"} {
		if !strings.Contains(text, part) {
			t.Errorf("no %q in:\n%s", part, text)
		}
	}
}

// Every text in quotes of one drug's block, and of no other; the escapes after
// TOML 1.0.0, "String".
func TestTextsOfABlock(t *testing.T) {
	r := findRecord([]byte(saidRecord), "invented", "ampoule 32.9 mg in 4.7 mL")
	got, ok := r.place.texts()
	want := []string{"invented", "N01AX07", "Not for the \"frail\":\tone dose lasts 17 to 35 h – see G5.", "ETO1", `Filter of 5 micrometres \ none`, "SMPC-MG",
		"First line, 13 days,\nsecond line.", "verified 2026-05-04", "ampoule 32.9 mg in 4.7 mL", "32.9 mg", "4.7 mL", "7 %", "BP-ADR", "65 years",
		"0.23 mg/kg", "ETO1", "0.37 mg/kg", "ETO1", "3500 microgram", "ETO1", "0.41 mg/kg/min", "31 mmol"}
	if !ok || strings.Join(got, "|") != strings.Join(want, "|") {
		t.Errorf("got %q %v, want %q", got, ok, want)
	}
	good := map[string]string{`"a\"b\\c"`: `a"b\c`, `"\u00e9\U0001F600"`: "é😀", `'a\'`: `a\`, "'''\na'b'''": "a'b", "\"\"\"a \\\n   b\"\"\"": "a b", `""`: ""}
	for text, want := range good {
		if got, rest, ok := tomlText(text + "x"); !ok || got != want || rest != "x" {
			t.Errorf("%s: got %q %q %v, want %q", text, got, rest, ok, want)
		}
	}
	for _, bad := range []string{`"a`, "\"a\nb\"", `"\q"`, `"\u12"`, `"\uD800"`, `"\U00110000"`, "'''a''", `"\`, "\"\\\n\"", `"\x41"`} {
		if _, _, ok := tomlText(bad); ok {
			t.Errorf("%q was read, want a refusal", bad)
		}
	}
}
