package quantity

import (
	"regexp"
	"strings"
	"testing"

	"drawup/dilution/quantity/lint"

	"pgregory.net/rapid"
)

// printed draws one random quantity of every sort and prints it in style s.
// Percent is left out: it is the width of an interval, not a strength, and the
// only print that carries a per cent sign.
func printed(t *rapid.T, s Style) []string {
	n, u := aRat().Draw(t, "n"), aUnit().Draw(t, "unit")
	b := rapid.SampledFrom([]Basis{Absolute, PerKilogram, PerSquareMetre}).Draw(t, "basis")
	p := rapid.SampledFrom([]Period{PerMinute, PerHour, PerDay}).Draw(t, "period")
	a := AmountOf(n, u)
	out := []string{
		s.Amount(a), s.Volume(Millilitres(n)), s.FlowRate(MillilitresPerHour(n)), s.Dose(doseOf(n, u, b)),
		s.DoseRate(doseRateOf(n, u, b, p)), s.BodyWeight(Kilograms(n)), s.Surface(SquareMetres(n)), s.Length(Centimetres(n)),
		s.Duration(Minutes(n)), s.DropRate(DropsPerMinute(n)), s.DropFactor(DropFactor{x: fromRat(n)}),
	}
	c, err := a.In(Millilitres(aRat().Draw(t, "volume")))
	if err != nil {
		t.Fatalf("%v", err)
	}
	out = append(out, s.Concentration(c))
	for _, unit := range allUnits() {
		if unit.Kind() == a.Kind() {
			out = append(out, s.AmountIn(a, unit), s.ConcentrationIn(c, unit))
		}
	}
	return out
}

// TestNothingForbiddenIsPrinted: no print breaks a rule of its house (package
// lint), and each is one number, one blank, one unit.
func TestNothingForbiddenIsPrinted(t *testing.T) {
	shape := regexp.MustCompile("^(?:0|[1-9][0-9]{0,2}(?:[,\u00a0][0-9]{3})*)(?:\\.[0-9]*[1-9])? " +
		"(?:g|mg|mcg|micrograms?|nanograms?|units?|milliunits?|mmol|micromol|mL|kg|cm|m²|drops?|h|min|s)(?:/kg|/m²)?(?:/mL|/h|/min|/day)?(?: [0-9]{1,2} (?:min|s))?$")
	rapid.Check(t, func(t *rapid.T) {
		s := rapid.SampledFrom(styles()).Draw(t, "style")
		house, ok := lint.Named(s.String())
		if !ok {
			t.Fatalf("the linter has no house %v", s)
		}
		for _, text := range printed(t, s) {
			for _, f := range house.Printed(text) {
				t.Fatalf("%v prints %q, which breaks %s", s, text, f.Rule.Code)
			}
			if !shape.MatchString(text) {
				t.Fatalf("%v prints %q, which is no number with a unit", s, text)
			}
		}
	})
}

// TestUnitsSuitTheirNumbers: amounts and concentrations stand in the unit that
// makes the number 1 or more, from 1 g in g, below in mg, below 1 mg in
// micrograms (rule N16: British National Formulary, prescription writing).
func TestUnitsSuitTheirNumbers(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := rapid.SampledFrom(styles()).Draw(t, "style")
		house, _ := lint.Named(s.String())
		a := AmountOf(aRat().Draw(t, "n"), aUnit().Draw(t, "unit"))
		c, err := a.In(Millilitres(aRat().Draw(t, "volume")))
		if err != nil {
			t.Fatal(err)
		}
		for _, text := range []string{s.Amount(a), s.Concentration(c)} {
			for _, f := range house.Typed(text) {
				// 999.9999 mg is less than 1 g and stays in mg, also where it is rounded.
				if f.Rule.Code == "N16" && f.Fix != "" && f.Fix != "1 g" && !strings.HasSuffix(text, "/mL") {
					t.Fatalf("%v prints %q, want %q", s, text, f.Fix)
				}
			}
		}
	})
}

// The table of the label rules, part 3: an amount or concentration as it comes,
// and what uk and us print. Sources: British National Formulary for microgram
// in full, Institute for Safe Medication Practices for mcg and the comma.
func TestHouseTable(t *testing.T) {
	for text, want := range map[string][2]string{
		"0.00005 g/mL": {"50 micrograms/mL", "50 mcg/mL"},
		"1 mg/mL":      {"1 mg/mL", "1 mg/mL"},
		"0.1 mg/mL":    {"100 micrograms/mL", "100 mcg/mL"},
		"0.16 mg/mL":   {"160 micrograms/mL", "160 mcg/mL"},
		"1 unit/mL":    {"1 unit/mL", "1 unit/mL"},
		"20 mg/mL":     {"20 mg/mL", "20 mg/mL"},
		"1:200000":     {"5 micrograms/mL", "5 mcg/mL"},
		"1:1000":       {"1 mg/mL", "1 mg/mL"},
		"1:10000":      {"100 micrograms/mL", "100 mcg/mL"},
		"1:400":        {"2.5 mg/mL", "2.5 mg/mL"},
	} {
		c, err := ParseConcentration(text)
		if err != nil {
			t.Fatalf("%q: %v", text, err)
		}
		for i, s := range []Style{UK(), US()} {
			if got := s.Concentration(c); got != want[i] {
				t.Errorf("%s %q: got %q, want %q", s, text, got, want[i])
			}
		}
	}
	a, err := ParseAmount("5000 units")
	if err != nil {
		t.Fatal(err)
	}
	for s, want := range map[Style]string{UK(): "5,000 units", US(): "5,000 units", SI(): "5\u00a0000 units"} {
		if got := s.Amount(a); got != want {
			t.Errorf("%s: got %q, want %q", s, got, want)
		}
	}
}

// TestStyleWords: uk and si never write mcg, us never microgram; si never
// groups by comma, the others only by it.
func TestStyleWords(t *testing.T) {
	never := map[string]*regexp.Regexp{
		"uk": regexp.MustCompile("mcg|\u00a0"), "us": regexp.MustCompile("microgram|\u00a0"), "si": regexp.MustCompile("mcg|,"),
	}
	rapid.Check(t, func(t *rapid.T) {
		s := rapid.SampledFrom(styles()).Draw(t, "style")
		for _, text := range printed(t, s) {
			if never[s.String()].MatchString(text) {
				t.Fatalf("%v prints %q", s, text)
			}
		}
	})
}
