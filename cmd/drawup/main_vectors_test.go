package main

import (
	"bytes"
	"encoding/json"
	"math/big"
	"os"
	"path/filepath"
	"strings"
	"testing"
)

// A vector is one row of testdata/vectors.
type vector struct {
	id, kind, answer, source, recomputed, agrees string
	in                                           map[string]string
	text                                         string // inputs as one text
}

// unsupported names the kinds of the collection that no command works, and why.
// There are none.
func unsupported() map[string]string { return map[string]string{} }

func readVectors(t *testing.T) []vector {
	t.Helper()
	files, err := filepath.Glob("../../testdata/vectors/*.tsv")
	if err != nil || len(files) < 6 {
		t.Fatalf("got %d vector files, %v", len(files), err)
	}
	var out []vector
	for _, name := range files {
		data, err := os.ReadFile(name)
		if err != nil {
			t.Fatal(err)
		}
		for i, row := range strings.Split(strings.TrimSuffix(string(data), "\n"), "\n") {
			f := strings.Split(row, "\t")
			if len(f) != 7 {
				t.Fatalf("%s: line %d: got %d columns, want 7", name, i+1, len(f))
			}
			if i == 0 {
				continue
			}
			v := vector{id: f[0], kind: f[1], text: f[2], answer: f[3], source: f[4], recomputed: f[5], agrees: f[6], in: map[string]string{}}
			for _, pair := range strings.Split(f[2], "; ") {
				if key, value, ok := strings.Cut(pair, "="); ok {
					v.in[key] = value
				}
			}
			out = append(out, v)
		}
	}
	return out
}

// TestVectors works every published row through the command and through the
// packages. The source of each row stands in its file.
func TestVectors(t *testing.T) {
	worked := 0
	for _, v := range readVectors(t) {
		if v.source == "" {
			t.Errorf("%s: no source", v.id)
		}
		if why, ok := unsupported()[v.kind]; ok {
			t.Errorf("%s: kind %q stands in testdata and is not worked: %s", v.id, v.kind, why)
			continue
		}
		t.Run(v.id+" "+v.kind, func(t *testing.T) { checkVector(t, v) })
		worked++
	}
	if worked != 172 {
		t.Errorf("got %d rows worked, want all 172 of the collection", worked)
	}
}

// A jsonAnswer is what the command says.
type jsonAnswer struct {
	exact *big.Rat // in the unit of the row
	doc   map[string]any
}

func checkVector(t *testing.T, v vector) {
	s, ok := sumOf(t, v)
	if !ok {
		t.Fatalf("kind %q of row %s is not known: add it to the test or to the list of kinds that are not worked", v.kind, v.id)
	}
	wantNumber, unit, _ := strings.Cut(v.recomputed, " ")
	unit = bareText(unit)
	api := s.shared(s.api(t))
	if !s.bare {
		api.Quo(api, scaleOf(t, unit))
	}
	if len(s.args) > 0 {
		got := ask(t, s, unit)
		if got.exact.Cmp(api) != 0 {
			t.Errorf("the command gives %s, the packages %s", got.exact.RatString(), api.RatString())
		}
		if _, decimals, _ := strings.Cut(strings.Fields(v.answer)[0], "."); v.kind == "rate" && v.agrees == "yes" && len(decimals) == 1 {
			checkPump(t, v, got.doc)
		}
		if v.agrees == "nominal" && !holdsCaution(got.doc, "bag-fill-unknown") {
			t.Error("the figures differ and no caution says so")
		}
	}
	want, ok := new(big.Rat).SetString(wantNumber)
	if !ok {
		t.Fatalf("recomputed %q is no number", v.recomputed)
	}
	if got := sevenDigits(api); got.Cmp(want) != 0 {
		t.Errorf("got %s %s, want %s (%s)", got.FloatString(8), unit, v.recomputed, v.source)
	}
	checkPublished(t, v, api)
}

// checkPump wants the published rate, which has one decimal, as the rate that a
// pump with a step of 0.1 mL/h is set to.
func checkPump(t *testing.T, v vector, doc map[string]any) {
	t.Helper()
	q, ok := doc["pump_rate"].(map[string]any)
	if !ok {
		t.Fatal("no pump_rate")
	}
	got, _ := new(big.Rat).SetString(q["exact"].(string))
	want, _ := new(big.Rat).SetString(strings.Fields(v.answer)[0])
	if got == nil || got.Cmp(want) != 0 {
		t.Errorf("pump rate: got %v, want %s", q["exact"], v.answer)
	}
}

// checkPublished compares with the published answer as the column agrees says.
func checkPublished(t *testing.T, v vector, x *big.Rat) {
	number, _, _ := strings.Cut(v.answer, " ")
	published, ok := new(big.Rat).SetString(number)
	if !ok {
		t.Fatalf("answer %q is no number", v.answer)
	}
	_, decimals, _ := strings.Cut(number, ".")
	step := new(big.Rat).SetFrac(big.NewInt(1), new(big.Int).Exp(big.NewInt(10), big.NewInt(int64(len(decimals))), nil))
	if strings.Contains(v.text, "round to 0.5 mL") {
		step = big.NewRat(1, 2)
	}
	same := halfUp(x, step).Cmp(published) == 0
	switch v.agrees {
	case "yes":
		if !same {
			t.Errorf("got %s, published %s", x.FloatString(8), v.answer)
		}
	case "NO":
		if same {
			t.Errorf("the published answer is wrong and came out: %s", v.answer)
		}
	case "nominal":
		if x.Cmp(published) == 0 {
			t.Errorf("the drug's own volume was left out: %s", v.answer)
		}
	case "approx":
	default:
		t.Errorf("agrees: got %q, want yes, approx, nominal or NO", v.agrees)
	}
}

// ask runs the command and reads the value at the key, in the unit of the row.
func ask(t *testing.T, s sum, unit string) jsonAnswer {
	t.Helper()
	var out, faults bytes.Buffer
	if code := run(append(s.args, "--json"), strings.NewReader(""), &out, &faults); code != exitMade {
		t.Fatalf("drawup %q: got exit %d: %s", s.args, code, faults.String())
	}
	var doc map[string]any
	if err := json.Unmarshal(out.Bytes(), &doc); err != nil {
		t.Fatal(err)
	}
	q, ok := doc[s.key].(map[string]any)
	if !ok {
		t.Fatalf("drawup %q: no %s in %s", s.args, s.key, out.String())
	}
	x, ok := new(big.Rat).SetString(q["exact"].(string))
	if !ok {
		t.Fatalf("exact %q is no number", q["exact"])
	}
	x = s.shared(x.Mul(x, scaleOf(t, q["unit"].(string))))
	if s.bare {
		return jsonAnswer{x, doc}
	}
	return jsonAnswer{x.Quo(x, scaleOf(t, unit)), doc}
}

func holdsCaution(doc map[string]any, code string) bool {
	list, _ := doc["cautions"].([]any)
	for _, c := range list {
		if m, ok := c.(map[string]any); ok && m["code"] == code {
			return true
		}
	}
	return false
}

// scaleOf is the test's own unit table: how many mg, units, mmol, mL, kg, m² a
// unit holds, per mL and per hour.
func scaleOf(t *testing.T, unit string) *big.Rat {
	t.Helper()
	base, tail, _ := strings.Cut(unit, "/")
	scales := map[string]*big.Rat{
		"g": big.NewRat(1000, 1), "mg": big.NewRat(1, 1), "mcg": big.NewRat(1, 1000), "microgram": big.NewRat(1, 1000),
		"ng": big.NewRat(1, 1000000), "nanogram": big.NewRat(1, 1000000), "unit": big.NewRat(1, 1), "units": big.NewRat(1, 1),
		"mmol": big.NewRat(1, 1), "micromol": big.NewRat(1, 1000), "mL": big.NewRat(1, 1), "kg": big.NewRat(1, 1), "m2": big.NewRat(1, 1), "mEq": big.NewRat(1, 1),
		"mg base": big.NewRat(1, 1), "L": big.NewRat(1000, 1), "cm": big.NewRat(1, 1), "drops": big.NewRat(1, 1), "%": big.NewRat(1, 1),
	}
	x, ok := scales[base]
	if !ok {
		t.Fatalf("the test does not know the unit %q", unit)
	}
	out := new(big.Rat).Set(x)
	if strings.HasSuffix(tail, "min") {
		out.Mul(out, big.NewRat(60, 1))
	}
	if strings.HasSuffix(tail, "day") {
		out.Quo(out, big.NewRat(24, 1))
	}
	return out
}

// halfUp is x to a multiple of step, ties up: the test's own rounding.
func halfUp(x, step *big.Rat) *big.Rat {
	n := new(big.Rat).Quo(x, step)
	n.Add(n, big.NewRat(1, 2))
	whole := new(big.Int).Div(n.Num(), n.Denom())
	return new(big.Rat).Mul(new(big.Rat).SetInt(whole), step)
}

// sevenDigits is x half up to seven significant digits.
func sevenDigits(x *big.Rat) *big.Rat {
	step := big.NewRat(1, 1)
	for x.Cmp(new(big.Rat).Mul(step, big.NewRat(10000000, 1))) >= 0 {
		step.Mul(step, big.NewRat(10, 1))
	}
	for x.Cmp(new(big.Rat).Mul(step, big.NewRat(1000000, 1))) < 0 {
		step.Quo(step, big.NewRat(10, 1))
	}
	return halfUp(x, step)
}
