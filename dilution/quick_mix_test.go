package dilution_test

import (
	"math/big"
	"strings"
	"testing"

	"drawup/dilution"
	"drawup/dilution/body"
	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// inventedStock is a formulary that nobody has: a drug in five presentations, so
// that each rule of a mixture can be broken alone.
const inventedStock = `name = "invented"
version = "1"
[sources.X]
title = "invented for a test"
grade = "A"
[[drug]]
name = "sleepwell"
atc = "N01AX99"
class = "IND"
counted = "mass"
  [[drug.presentation]]
  id = "ampoule 50 mg in 5 mL"
  container = "ampoule"
  form = "solution"
  amount = "50 mg"
  volume = "5 mL"
  source = "X"
  uses = ["bolus", "infusion"]
  neat = false
  age_from = "3 years"
  diluent = [{ name = "glucose 5 %", source = "X" }, { name = "water for injections", source = "X" }]
  forbidden_diluent = [{ name = "sodium chloride 0.9 %", reason = "it precipitates", source = "X" }]
  [[drug.presentation]]
  id = "ampoule 20 mg in 10 mL"
  container = "ampoule"
  form = "solution"
  amount = "20 mg"
  volume = "10 mL"
  source = "X"
  unverified = true
  uses = ["bolus", "infusion"]
  neat = true
  diluent = [{ name = "sodium chloride 0.9 %", source = "X" }]
  [[drug.presentation]]
  id = "vial 100 mg"
  container = "vial"
  form = "powder"
  amount = "100 mg"
  source = "X"
  uses = ["bolus"]
  neat = true
  add = "9.8 mL"
  add_fluids = ["water for injections"]
  displacement = { value = "0.2 mL", source = "X" }
  diluent = [{ name = "glucose 5 %", source = "X" }]
  [[drug.presentation]]
  id = "vial 250 mg"
  container = "vial"
  form = "powder"
  amount = "250 mg"
  source = "X"
  uses = ["bolus"]
  neat = true
  add = "10 mL"
  add_fluids = ["water for injections"]
  [[drug.concentration]]
  use = "bolus"
  line = "any"
  low = { value = "1 mg/mL", source = "X" }
  high = { value = "10 mg/mL", source = "X" }
  [[drug.concentration]]
  use = "infusion"
  line = "central"
  low = { value = "1 mg/mL", source = "X" }
  high = { value = "5 mg/mL", source = "X" }
  [[drug.dose]]
  for = "induction"
  routes = ["IV"]
  by = "none"
  usual_low = { value = "10 mg", source = "X" }
  usual_high = { value = "20 mg", source = "X" }
  day_max = { value = "90 mg", source = "X" }
  [[drug.infusion]]
  for = "sedation"
  routes = ["IV"]
  by = "none"
  usual_low = { value = "3 mg/h", source = "X" }
  usual_high = { value = "5 mg/h", source = "X" }
  course_max = { value = "100 mg", source = "X" }
  longest = { value = "30 h", source = "X" }
[[drug]]
name = "numb"
atc = "N01BB99"
class = "LA"
counted = "mass"
  [[drug.presentation]]
  id = "ampoule 100 mg in 10 mL"
  container = "ampoule"
  form = "solution"
  amount = "100 mg"
  volume = "10 mL"
  source = "X"
  uses = ["bolus"]
  neat = true
  [[drug.local_maximum]]
  with_adrenaline = false
  age_from = "18 years"
  by = "lean"
  by_source = "X"
  per_kg = { value = "4 mg/kg", source = "X" }
  total = { value = "200 mg", source = "X" }
  [[drug.local_maximum]]
  with_adrenaline = true
  age_from = "18 years"
  by = "lean"
  by_source = "X"
  per_kg = { value = "7 mg/kg", source = "X" }
[[drug]]
name = "oldnumb"
atc = "N01BB98"
class = "LA"
counted = "mass"
  [[drug.presentation]]
  id = "ampoule 100 mg in 10 mL"
  container = "ampoule"
  form = "solution"
  amount = "100 mg"
  volume = "10 mL"
  source = "X"
  uses = ["bolus"]
  neat = true
`

func invented(t *testing.T) *formulary.Formulary {
	t.Helper()
	f, faults := formulary.Read(formulary.Text{Name: "invented.toml", Data: []byte(inventedStock)})
	if faults.Refused() {
		t.Fatal(faults)
	}
	return f
}

func must[T any](t *testing.T, parse func(string) (T, error), s string) T {
	t.Helper()
	var none T
	if s == "" {
		return none
	}
	v, err := parse(s)
	if err != nil {
		t.Fatal(err)
	}
	return v
}

// TestQuickMix breaks one rule at a time. What is refused is what an order of the
// same mixture is refused for: design rules R7, R10, R12.
func TestQuickMix(t *testing.T) {
	for _, c := range mixCases() {
		t.Run(c.name, func(t *testing.T) { c.check(t, invented(t)) })
	}
}

// A mixCase is one mixture of the invented drug, and the codes that refuse it.
type mixCase struct {
	name            string
	infusion        bool
	stock, strength string
	method          dilution.Method
	powder, drug    string
	final, conc     string
	fluid, age      string
	line, route     string
	want            string // codes of refusals, blank for none
}

func (c mixCase) check(t *testing.T, f *formulary.Formulary) {
	q := dilution.Quick{
		Drug: "sleepwell", Infusion: c.infusion, Line: c.line, Route: c.route, Diluent: c.fluid, Style: quantity.UK(),
		Age: must(t, body.ParseAge, c.age), Strength: must(t, quantity.ParseConcentration, c.strength),
		Concentration: must(t, quantity.ParseConcentration, c.conc),
		Mix: &dilution.QuickMix{
			Presentation: c.stock, Method: c.method, Powder: must(t, quantity.ParseAmount, c.powder),
			Drug: must(t, quantity.ParseVolume, c.drug), Final: must(t, quantity.ParseVolume, c.final),
		},
	}
	list, limits := q.Check(f)
	var got []string
	for _, code := range list.Refusals().Codes() {
		got = append(got, string(code))
	}
	if strings.Join(got, " ") != c.want {
		t.Errorf("got %v, want %q\n%v", got, c.want, list)
	}
	if c.want == "" && len(limits.Presentations) == 0 {
		t.Error("the presentation is not told")
	}
}

func mixCases() []mixCase {
	return []mixCase{
		{name: "as listed", strength: "10 mg/mL", method: dilution.MakeUpTo, drug: "1 mL", final: "5 mL", conc: "2 mg/mL", fluid: "glucose 5 %"},
		{name: "the only fluid need not be named", strength: "2 mg/mL", method: dilution.MakeUpTo, drug: "5 mL", final: "10 mL", conc: "1 mg/mL"},
		{name: "no fluid of two", stock: "ampoule 50 mg in 5 mL", strength: "10 mg/mL", method: dilution.MakeUpTo, drug: "1 mL", final: "5 mL", conc: "2 mg/mL", want: "diluent-missing"},
		{name: "a forbidden fluid", stock: "ampoule 50 mg in 5 mL", method: dilution.MakeUpTo, drug: "1 mL", final: "5 mL", conc: "2 mg/mL", fluid: "sodium chloride 0.9 %", want: "diluent-forbidden"},
		{name: "a fluid not listed", strength: "2 mg/mL", method: dilution.MakeUpTo, drug: "5 mL", final: "10 mL", conc: "1 mg/mL", fluid: "glucose 5 %", want: "diluent-not-listed"},
		{name: "a strength that nobody has", strength: "3 mg/mL", method: dilution.MakeUpTo, drug: "1 mL", final: "3 mL", conc: "1 mg/mL", fluid: "glucose 5 %", want: "presentation-unknown"},
		{name: "a presentation that nobody has", stock: "ampoule 1 g", method: dilution.MakeUpTo, final: "3 mL", conc: "1 mg/mL", want: "presentation-unknown"},
		{name: "no presentation at all", method: dilution.MakeUpTo, final: "3 mL", conc: "1 mg/mL", want: "presentation-unclear"},
		{name: "strength against presentation", stock: "ampoule 50 mg in 5 mL", strength: "2 mg/mL", method: dilution.MakeUpTo, drug: "1 mL", final: "2 mL", conc: "1 mg/mL", fluid: "glucose 5 %", want: "amounts-contradict"},
		{name: "two of one strength that differ", strength: "10 mg/mL", method: dilution.MakeUpTo, drug: "1 mL", final: "5 mL", conc: "2 mg/mL", fluid: "water for injections", want: "presentation-unclear"},
		{name: "neat", strength: "2 mg/mL", method: dilution.Neat, drug: "5 mL", final: "5 mL", conc: "2 mg/mL"},
		{name: "never neat", stock: "ampoule 50 mg in 5 mL", method: dilution.Neat, drug: "1 mL", final: "1 mL", conc: "10 mg/mL", want: "must-be-diluted"},
		{name: "too strong", infusion: true, line: "central", stock: "ampoule 50 mg in 5 mL", method: dilution.MakeUpTo, drug: "45 mL", final: "50 mL", conc: "9 mg/mL", fluid: "glucose 5 %", want: "concentration-above-limit"},
		{name: "too weak", strength: "2 mg/mL", method: dilution.MakeUpTo, drug: "1 mL", final: "50 mL", conc: "0.04 mg/mL", want: "concentration-below-limit"},
		{name: "no bounds for the line", infusion: true, strength: "2 mg/mL", method: dilution.MakeUpTo, drug: "25 mL", final: "50 mL", conc: "1 mg/mL", want: "formulary-blank"},
		{name: "too young", stock: "ampoule 50 mg in 5 mL", age: "2 years", method: dilution.MakeUpTo, drug: "1 mL", final: "5 mL", conc: "2 mg/mL", fluid: "glucose 5 %", want: "age-outside-range"},
		{name: "a route not listed", strength: "2 mg/mL", method: dilution.Neat, drug: "5 mL", final: "5 mL", conc: "2 mg/mL", route: "epidural", want: "route-not-listed"},
		{name: "powder as stored", powder: "100 mg", method: dilution.Neat, final: "10 mL", conc: "10 mg/mL", fluid: "water for injections"},
		{name: "two vials of it", powder: "200 mg", method: dilution.Neat, final: "20 mL", conc: "10 mg/mL"},
		{name: "powder in another volume", powder: "100 mg", method: dilution.Neat, final: "20 mL", conc: "5 mg/mL", want: "formulary-blank"},
		{name: "powder in another fluid", powder: "100 mg", method: dilution.Neat, final: "10 mL", conc: "10 mg/mL", fluid: "glucose 5 %", want: "diluent-not-listed"},
		{name: "powder of unknown displacement", powder: "250 mg", method: dilution.Neat, final: "25 mL", conc: "10 mg/mL", want: "displacement-blank"},
		{name: "powder that nobody has", powder: "70 mg", method: dilution.Neat, final: "7 mL", conc: "10 mg/mL", want: "presentation-unknown"},
		{name: "powder against a presentation", stock: "ampoule 20 mg in 10 mL", powder: "100 mg", method: dilution.Neat, final: "10 mL", conc: "10 mg/mL", want: "amounts-contradict"},
	}
}

// TestQuickMixTells holds what comes along: the presentation, its containers,
// the fluid, and figures that nobody has verified (rule R13).
func TestQuickMixTells(t *testing.T) {
	q := dilution.Quick{
		Drug: "sleepwell", Style: quantity.UK(), Strength: must(t, quantity.ParseConcentration, "2 mg/mL"),
		Concentration: must(t, quantity.ParseConcentration, "1 mg/mL"),
		Mix: &dilution.QuickMix{Method: dilution.MakeUpTo, Drug: quantity.Millilitres(big.NewRat(101, 1)),
			Final: quantity.Millilitres(big.NewRat(202, 1))},
	}
	list, limits := q.Check(invented(t))
	if len(limits.Presentations) != 1 || limits.Presentations[0].ID != "ampoule 20 mg in 10 mL" || limits.Containers != 11 || limits.Diluent != "sodium chloride 0.9 %" {
		t.Errorf("got %v, %d, %q", limits.Presentations, limits.Containers, limits.Diluent)
	}
	said := map[refusal.Code]bool{}
	for _, r := range list.Cautions() {
		said[r.Code] = true
	}
	for _, code := range []refusal.Code{refusal.ContainersMany, refusal.Unverified} {
		if !said[code] {
			t.Errorf("no caution %s in %v", code, list)
		}
	}
	assay, assumed, err := dilution.WidestAssay(limits.Presentations)
	if err != nil || !assumed || assay.Exact() != "10" {
		t.Errorf("assay: got %s, %v, %v", assay.Exact(), assumed, err)
	}
	if p, list := q.Stock(invented(t)); !list.Refused() {
		t.Errorf("got %q of three presentations, want it asked which", p.ID)
	}
}

// TestLocalSums adds shares of maxima up; the maxima are invented, 4 mg/kg and
// 200 mg plain, 7 mg/kg with adrenaline; the sums are by hand.
func TestLocalSums(t *testing.T) {
	for _, c := range localCases() {
		t.Run(c.name, func(t *testing.T) { c.check(t, invented(t)) })
	}
}

// A localCase is what one patient is given: a drug, strength, volume, and the
// user's own maxima, per kg and in all, each.
type localCase struct {
	name, weight, age string
	given             [][5]string
	total             string // of the maximum, exact; blank for refused
	left              string // volume of the first that would still fit
	want              string // codes of refusals
}

func localCases() []localCase {
	numb := func(volume, perKg, inAll string) [5]string { return [5]string{"numb", "1 %", volume, perKg, inAll} }
	return []localCase{
		// A135 (worked formula of maximum recommended doses): 7 mg/kg x 60 kg of 1 % are 42 mL.
		{"typed alone", "60 kg", "", [][5]string{{"other with adrenaline", "1 %", "", "7 mg/kg", ""}}, "0", "42", ""},
		{"stored, with adrenaline", "60 kg", "30 years", [][5]string{{"numb with adrenaline", "1 %", "", "", ""}}, "0", "42", ""},
		{"stored", "40 kg", "30 years", [][5]string{numb("8 mL", "", "")}, "1/2", "8", ""},
		{"absolute maximum", "100 kg", "30 years", [][5]string{numb("5 mL", "", "")}, "1/4", "15", ""},
		{"two drugs", "40 kg", "30 years", [][5]string{numb("4 mL", "", ""), {"other", "0.25 %", "8 mL", "2 mg/kg", ""}}, "1/2", "8", ""},
		{"just one", "40 kg", "30 years", [][5]string{numb("8 mL", "", ""), {"numb", "2 %", "4 mL", "", ""}}, "1", "0", ""},
		{"together too much", "40 kg", "30 years", [][5]string{numb("9 mL", "", ""), {"other", "0.25 %", "16 mL", "2 mg/kg", ""}}, "17/16", "", "local-anaesthetic-sum"},
		{"a lower one typed", "40 kg", "30 years", [][5]string{numb("4 mL", "", "80 mg")}, "1/2", "4", ""},
		{"a higher one typed", "40 kg", "30 years", [][5]string{numb("4 mL", "5 mg/kg", "")}, "", "", "dose-above-hard-limit"},
		{"a higher one typed, with adrenaline", "40 kg", "30 years", [][5]string{{"numb with epinephrine", "1 %", "4 mL", "8 mg/kg", ""}}, "", "", "dose-above-hard-limit"},
		{"a drug without maxima", "40 kg", "30 years", [][5]string{{"oldnumb", "1 %", "4 mL", "", ""}}, "", "", "formulary-blank"},
		{"a drug without maxima, typed", "40 kg", "30 years", [][5]string{{"oldnumb", "1 %", "4 mL", "2 mg/kg", ""}}, "1/2", "4", ""},
		{"unknown drug", "40 kg", "30 years", [][5]string{{"other", "1 %", "4 mL", "", ""}}, "", "", "drug-unknown"},
		{"misspelt", "40 kg", "30 years", [][5]string{{"nunb", "1 %", "4 mL", "9 mg/kg", ""}}, "", "", "drug-unknown"},
		{"a word added", "40 kg", "30 years", [][5]string{{"numb plain", "1 %", "4 mL", "9 mg/kg", ""}}, "", "", "drug-unknown"},
		{"no local anaesthetic", "40 kg", "30 years", [][5]string{{"sleepwell", "1 %", "4 mL", "", ""}}, "", "", "value-unknown"},
		{"no weight", "", "30 years", [][5]string{numb("4 mL", "", "")}, "", "", "weight-missing"},
		{"no age", "40 kg", "", [][5]string{numb("4 mL", "", "")}, "", "", "age-missing"},
		{"a child", "20 kg", "8 years", [][5]string{numb("4 mL", "", "")}, "", "", "age-outside-range"},
		{"units", "40 kg", "30 years", [][5]string{{"numb", "1 unit/mL", "4 mL", "", ""}}, "", "", "units-against-mass"},
	}
}

func (c localCase) check(t *testing.T, f *formulary.Formulary) {
	sum := dilution.LocalSum{Weight: must(t, quantity.ParseBodyWeight, c.weight), Age: must(t, body.ParseAge, c.age), Style: quantity.UK()}
	for _, g := range c.given {
		sum.Given = append(sum.Given, dilution.LocalGiven{
			Drug: g[0], Concentration: must(t, quantity.ParseConcentration, g[1]), Volume: must(t, quantity.ParseVolume, g[2]),
			MostPerKg: must(t, quantity.ParseDose, g[3]), MostInAll: must(t, quantity.ParseAmount, g[4]),
		})
	}
	shares, total, list := sum.Work(f)
	var got []string
	for _, code := range list.Refusals().Codes() {
		got = append(got, string(code))
	}
	if strings.Join(got, " ") != c.want {
		t.Fatalf("got %v, want %q\n%v", got, c.want, list)
	}
	if c.total != "" && total.RatString() != c.total {
		t.Errorf("got %s of the maximum, want %s", total.RatString(), c.total)
	}
	if c.left != "" && shares[0].LeftVolume.Exact() != c.left {
		t.Errorf("got room for %s mL, want %s", shares[0].LeftVolume.Exact(), c.left)
	}
}
