package main

import (
	"bytes"
	"encoding/json"
	"math/big"
	"strings"
	"testing"
)

// exactOf runs the command and returns the exact value at the key and its unit.
func exactOf(t *testing.T, key string, args ...string) (*big.Rat, string) {
	t.Helper()
	var out, faults bytes.Buffer
	if code := run(append(args, "--json"), strings.NewReader(""), &out, &faults); code != exitMade {
		t.Fatalf("drawup %q: got exit %d: %s", args, code, faults.String())
	}
	var doc map[string]json.RawMessage
	if err := json.Unmarshal(out.Bytes(), &doc); err != nil {
		t.Fatal(err)
	}
	var q quantityJSON
	if err := json.Unmarshal(doc[key], &q); err != nil {
		t.Fatalf("drawup %q: %s: %v", args, key, err)
	}
	x, ok := new(big.Rat).SetString(q.Exact)
	if !ok {
		t.Fatalf("drawup %q: exact %q is no number", args, q.Exact)
	}
	return x, q.Unit
}

// TestConversionConstants holds every line of the table of constants for mL/h,
// worked by algebra from flow = dose x size x time factor x amount factor /
// concentration: flow = dose x factor / concentration, times 60 kg or 1.5 m²
// where the dose goes by it. Two doses each.
func TestConversionConstants(t *testing.T) {
	for _, c := range []struct {
		dose, conc, size, factor string
	}{
		{"microgram/kg/min", "microgram/mL", "weight", "60"},
		{"microgram/kg/min", "mg/mL", "weight", "0.06"},
		{"microgram/kg/h", "microgram/mL", "weight", "1"},
		{"mg/kg/h", "mg/mL", "weight", "1"},
		{"mg/h", "mg/mL", "", "1"},
		{"microgram/min", "microgram/mL", "", "60"},
		{"ng/kg/min", "ng/mL", "weight", "60"},
		{"ng/kg/min", "microgram/mL", "weight", "0.06"},
		{"units/kg/h", "units/mL", "weight", "1"},
		{"milliunits/min", "units/mL", "", "0.06"},
		{"milliunits/kg/min", "units/mL", "weight", "0.06"},
		{"mmol/h", "mmol/mL", "", "1"},
		{"micromol/kg/min", "mmol/mL", "weight", "0.06"},
		{"mg/m2/h", "mg/mL", "surface", "1"},
		{"g/h", "mg/mL", "", "1000"},
	} {
		for _, dose := range []string{"0.7", "12"} {
			args := []string{"rate", "--dose", dose + " " + c.dose, "--concentration", "0.8 " + c.conc, "--step", "0.00001 mL/h"}
			want, _ := new(big.Rat).SetString(dose)
			factor, _ := new(big.Rat).SetString(c.factor)
			want.Mul(want, factor).Quo(want, big.NewRat(8, 10))
			switch c.size {
			case "weight":
				args = append(args, "--weight", "60 kg")
				want.Mul(want, big.NewRat(60, 1))
			case "surface":
				args = append(args, "--surface", "1.5 m2")
				want.Mul(want, big.NewRat(3, 2))
			}
			if got, unit := exactOf(t, "flow_rate", args...); got.Cmp(want) != 0 || unit != "mL/h" {
				t.Errorf("%s %s at 0.8 %s: got %s %s, want %s mL/h", dose, c.dose, c.conc, got.RatString(), unit, want.RatString())
			}
		}
	}
}

// TestPercentAndRatio holds the definitions: p % w/v is p g in 100 mL, 1 in N
// is 1 g in N mL. The New Zealand intensive-care drug manual, appendix 10, and
// a student's dosage cards print the same figures.
func TestPercentAndRatio(t *testing.T) {
	for _, c := range []struct{ from, to, want string }{
		{"1 %", "mg/mL", "10"},
		{"0.9 %", "mg/mL", "9"},
		{"8.4 %", "mg/mL", "84"},
		{"1:1000", "mg/mL", "1"},
		{"1:10000", "microgram/mL", "100"},
		{"1 in 10,000", "microgram/mL", "100"},
		{"1:200000", "microgram/mL", "5"},
	} {
		want, _ := new(big.Rat).SetString(c.want)
		if got, _ := exactOf(t, "result", "convert", "--from", c.from, "--to", c.to); got.Cmp(want) != 0 {
			t.Errorf("%s in %s: got %s, want %s", c.from, c.to, got.RatString(), c.want)
		}
	}
}

// TestDilutionFormulas holds the six sums of the table of dilutions, each
// worked by hand from its formula.
func TestDilutionFormulas(t *testing.T) {
	for _, c := range []struct{ name, key, want, args string }{
		{"one step, V1 = C2 V2 / C1 = 0.08 x 50 / 2", "drug_volume", "2", "--concentration|0.08 mg/mL|--final|50 mL|--strength|2 mg/mL"},
		{"one step, diluent = V2 - V1", "diluent_volume", "48", "--concentration|0.08 mg/mL|--final|50 mL|--strength|2 mg/mL"},
		{"added to a full bag, C1 V1 / (B + V1) = 40 x 5 / 255", "concentration", "40000/51", "--take|5 mL|--strength|40 mg/mL|--add-to|250 mL"},
		{"withdraw and replace, C1 V1 / B = 40 x 5 / 250", "concentration", "800", "--take|5 mL|--strength|40 mg/mL|--replace-in|250 mL"},
		{"withdraw and replace, what stays", "diluent_volume", "245", "--take|5 mL|--strength|40 mg/mL|--replace-in|250 mL"},
		{"second step of two, 10 x (1/10) x (1/10)", "concentration", "100", "--take|1 mL|--strength|1 mg/mL|--make-up-to|10 mL"},
		{"reconstitution, mass / (diluent + displacement) = 250 / 5.2", "concentration", "625/13", "--powder|250 mg|--add|5 mL|--displacement|0.2 mL"},
		{"diluent to reach C = mass / C - displacement = 250 / 50 - 0.2", "diluent_volume", "4.8", "--powder|250 mg|--concentration|50 mg/mL|--displacement|0.2 mL"},
	} {
		want, _ := new(big.Rat).SetString(c.want)
		args := append([]string{"mix"}, strings.Split(c.args, "|")...)
		if got, unit := exactOf(t, c.key, args...); got.Cmp(want) != 0 {
			t.Errorf("%s: got %s %s, want %s", c.name, got.RatString(), unit, c.want)
		}
	}
}

// TestMoleFigures holds published figures of salts, to their printed decimals.
func TestMoleFigures(t *testing.T) {
	for _, c := range []struct {
		from, to, of, want, step, source string
	}{
		{"50 %", "mmol/mL", "magnesium sulfate heptahydrate", "2", "1", "UK SmPC, magnesium sulfate 50 % w/v, 2019"},
		{"4 g", "mmol", "magnesium sulfate heptahydrate", "16", "1", "UK SmPC, magnesium sulfate 50 % w/v, 2019"},
		{"1 g", "mmol", "calcium in calcium chloride dihydrate", "6.8", "0.1", "New Zealand ICU drug manual, appendix 10"},
		{"1 g", "mmol", "chloride in calcium chloride dihydrate", "13.6", "0.1", "New Zealand ICU drug manual, appendix 10"},
		{"8.4 %", "mmol/mL", "sodium bicarbonate", "1", "0.1", "New Zealand ICU drug manual, appendix 10"},
		{"1.4 mEq/mL", "mg/mL", "calcium in calcium chloride dihydrate", "100", "10", "US label, calcium chloride 10 %: 1.4 mEq/mL"},
		{"6.7 mg", "mmol", "sodium", "0.29", "0.01", "UK/EU SmPC, noradrenaline 1 mg/mL concentrate"},
		{"1.49 g", "mmol", "potassium chloride", "20", "1", "US product label, potassium chloride in 0.45 % sodium chloride: 1.49 g/L, 20 mEq/L"},
		{"20 mEq/L", "mg/mL", "potassium chloride", "1.49", "0.01", "the same label, the other way"},
	} {
		want, _ := new(big.Rat).SetString(c.want)
		step, _ := new(big.Rat).SetString(c.step)
		got, _ := exactOf(t, "result", "convert", "--from", c.from, "--to", c.to, "--of", c.of)
		if halfUp(got, step).Cmp(want) != 0 {
			t.Errorf("%s of %s: got %s %s, want %s (%s)", c.from, c.of, got.FloatString(6), c.to, c.want, c.source)
		}
	}
}

// TestBodyFigures holds the check values that clinPK 0.14.0 (R package, CRAN,
// 2024) prints in its unit tests, to their printed decimals.
func TestBodyFigures(t *testing.T) {
	for _, c := range []struct{ weight, height, sex, key, want, step string }{
		{"80 kg", "180 cm", "male", "surface_dubois", "1.996", "0.001"},
		{"80 kg", "180 cm", "male", "surface_mosteller", "2.000", "0.001"},
		{"80 kg", "180 cm", "male", "ideal_devine", "75.0", "0.1"},
		{"60 kg", "160 cm", "female", "ideal_devine", "52.381890", "0.000001"},
		{"60 kg", "160 cm", "male", "ideal_devine", "56.881890", "0.000001"},
		{"80 kg", "180 cm", "male", "adjusted", "77.0", "0.1"},
		{"80 kg", "150 cm", "male", "lean_janmahasatian", "51.643454", "0.000001"},
		{"80 kg", "150 cm", "female", "lean_james", "43.502222", "0.000001"},
	} {
		want, _ := new(big.Rat).SetString(c.want)
		step, _ := new(big.Rat).SetString(c.step)
		got, _ := exactOf(t, c.key, "body", "--weight", c.weight, "--height", c.height, "--sex", c.sex, "--age", "40 years")
		if halfUp(got, step).Cmp(want) != 0 {
			t.Errorf("%s, %s, %s: %s: got %s, want %s", c.weight, c.height, c.sex, c.key, got.FloatString(8), c.want)
		}
	}
}

// TestPoundAndInch holds the legal definitions: the pound is 0.45359237 kg, the
// inch 2.54 cm (international yard and pound agreement, 1959).
func TestPoundAndInch(t *testing.T) {
	for _, c := range []struct{ from, to, want string }{
		{"143 pounds", "kg", "64.86370891"},
		{"1 stone", "kg", "6.35029318"},
		{"11 stone 4 pounds", "kg", "71.66759446"},
		{"70 inches", "cm", "177.8"},
		{"5 feet 10 inches", "cm", "177.8"},
		{"3200 g", "kg", "3.2"},
	} {
		want, _ := new(big.Rat).SetString(c.want)
		if got, _ := exactOf(t, "result", "convert", "--from", c.from, "--to", c.to); got.Cmp(want) != 0 {
			t.Errorf("%s: got %s, want %s %s", c.from, got.RatString(), c.want, c.to)
		}
	}
}
