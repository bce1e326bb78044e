package main

import (
	"math/big"
	"strings"
	"testing"
)

// A sum is one vector as the program is asked: the command's arguments, the key
// of its answer, and the same sum through the packages, in mg, units, mmol, mL,
// kg or m², and per hour. Both are divided by per when it is set, or divide over;
// bare answers are not in the unit of the row.
type sum struct {
	args      []string
	key       string
	api       func(*testing.T) *big.Rat
	per, over *big.Rat
	bare      bool
}

// shared is x divided by per, or over divided by x.
func (s sum) shared(x *big.Rat) *big.Rat {
	switch {
	case s.per != nil:
		return x.Quo(x, s.per)
	case s.over != nil:
		return x.Quo(s.over, x)
	}
	return x
}

// sumOf says how a row is asked, by its kind; rows that are written in words
// stand in wordedRows.
func sumOf(t *testing.T, v vector) (sum, bool) {
	t.Helper()
	if s, ok := wordedRows()[v.id]; ok {
		return s.withAPI(), true
	}
	switch v.kind {
	case "rate", "units-rate", "rate-per-kg", "mass-rate":
		return rateRow(t, v).withAPI(), true
	case "reverse-rate", "reverse-mass-rate":
		return reverseRow(v).withAPI(), true
	case "bolus-volume", "la-max", "mass-dose":
		return doseRow(t, v).withAPI(), true
	case "dilution-one", "dilution-two", "reconstitution":
		return mixRow(v).withAPI(), true
	case "body-bsa", "body-ibw", "body-abw", "body-lbw", "body-bmi":
		return bodyRow(v).withAPI(), true
	case "daily-total", "amount", "flow", "drop-rate":
		return timeRow(v).withAPI(), true
	case "tolerance":
		return sum{args: []string{"accuracy", "--barrel", v.in["nominal"], "--reading", bareText(v.in["expelled"])}, key: "tolerance"}.withAPI(), true
	case "paed-weight":
		return sum{args: []string{"body", "--age", v.in["age"] + "ear", "--estimate", v.in["method"]}, key: "estimated_weight"}.withAPI(), true
	}
	return sum{}, false
}

// bareText is a value without the remark in brackets.
func bareText(s string) string {
	head, _, _ := strings.Cut(s, " (")
	return head
}

// weightOf is the row's weight in kg. Rows in pounds name the divisor 2.2.
func weightOf(t *testing.T, v vector) string {
	if band, ok := v.in["weight band"]; ok {
		_, mid, _ := strings.Cut(band, "(mid ")
		return strings.TrimSuffix(mid, ")") + " kg"
	}
	w, ok := v.in["weight"]
	if !ok || !strings.Contains(w, "lb") {
		return w
	}
	number, _, _ := strings.Cut(w, " ")
	x, ok := new(big.Rat).SetString(number)
	if !ok || !strings.Contains(w, "(2.2 lb/kg)") {
		t.Fatalf("weight %q is not understood", w)
	}
	x.Quo(x, big.NewRat(22, 10))
	text := strings.TrimRight(strings.TrimRight(x.FloatString(11), "0"), ".")
	return text + " kg"
}

func concentrationArgs(v vector) []string {
	if p, ok := v.in["prep"]; ok {
		return []string{"--mix", bareText(p)}
	}
	for _, key := range []string{"conc", "stock", "strength"} {
		if c, ok := v.in[key]; ok {
			return []string{"--concentration", bareText(c)}
		}
	}
	return []string{"--concentration", "1 mg/mL"} // the row asks for the amount
}

func rateRow(t *testing.T, v vector) sum {
	args := append([]string{"rate", "--dose", v.in["dose"]}, concentrationArgs(v)...)
	if w := weightOf(t, v); w != "" {
		args = append(args, "--weight", w)
	} else if v.kind == "rate-per-kg" {
		args = append(args, "--weight", "1 kg")
	}
	return sum{args: args, key: "flow_rate"}
}

func reverseRow(v vector) sum {
	_, unit, _ := strings.Cut(v.recomputed, " ")
	args := append([]string{"rate", "--rate", v.in["flow"], "--as", unit}, concentrationArgs(v)...)
	if w, ok := v.in["weight"]; ok {
		args = append(args, "--weight", w)
	}
	return sum{args: args, key: "dose_rate"}
}

func doseRow(t *testing.T, v vector) sum {
	dose, ok := v.in["dose"]
	if !ok {
		dose = v.in["max"]
	}
	args := append([]string{"dose", "--dose", dose}, concentrationArgs(v)...)
	if w := weightOf(t, v); w != "" {
		args = append(args, "--weight", w)
	}
	s := sum{args: args, key: "volume"}
	if v.kind == "mass-dose" {
		s.key = "amount"
	}
	return s
}

func mixRow(v vector) sum {
	s := sum{args: []string{"mix"}, key: "concentration"}
	flag := func(name, value string) { s.args = append(s.args, "--"+name, value) }
	switch {
	case v.kind == "reconstitution":
		mass, ok := v.in["vial"]
		if !ok {
			mass, s.key = v.in["dose"], "final_volume"
		}
		flag("powder", mass)
		flag("add", v.in["diluent"])
		flag("displacement", v.in["displacement"])
		return s
	case v.in["final"] != "" && v.in["take"] == "":
		flag("amount", v.in["amount"])
		flag("final", v.in["final"])
		return s
	}
	strength := v.in["stock"] + v.in["vial"] + v.in["amount"]
	take := v.in["take"]
	if take == "" { // the whole ampoule
		_, take, _ = strings.Cut(strength, " in ")
	}
	flag("strength", strength)
	flag("take", take)
	for key, name := range map[string]string{"diluent": "diluent", "added to": "add-to", "added to bag": "add-to", "final": "make-up-to"} {
		if x, ok := v.in[key]; ok {
			flag(name, x)
		}
	}
	if _, bag, ok := strings.Cut(v.text, "replaced into "); ok {
		flag("replace-in", strings.TrimSuffix(bag, " bag"))
	}
	return s
}

// timeRow is a sum of a volume, a rate or a dose over a time.
func timeRow(v vector) sum {
	command, key := "total", "total"
	switch v.kind {
	case "flow":
		command, key = "flow", "flow_rate"
	case "drop-rate":
		command, key = "flow", "drop_rate"
	}
	args := []string{command}
	for _, name := range []string{"volume", "rate", "time", "load", "set"} {
		if x, ok := v.in[name]; ok {
			args = append(args, "--"+name, x)
		}
	}
	return sum{args: args, key: key}
}

func bodyRow(v vector) sum {
	if ideal, ok := v.in["ibw"]; ok {
		return sum{args: []string{"body", "--weight", v.in["weight"], "--ideal", ideal}, key: "adjusted"}
	}
	or := func(key, other string) string {
		if x, ok := v.in[key]; ok {
			return x
		}
		return other
	}
	height := or("height", "170 cm")
	if v.in["bmi"] == "20" && v.in["weight"] == "80 kg" {
		height = "200 cm" // the height at which 80 kg is a body mass index of 20
	}
	sex := "male"
	if v.in["sex"] == "F" {
		sex = "female"
	}
	// Rows name no age; the equations want an adult's.
	age := "40 years"
	keys := map[string]string{
		"Mosteller": "surface_mosteller", "Du Bois": "surface_dubois", "Haycock": "surface_haycock", "Boyd": "surface_boyd",
		"Devine": "ideal_devine", "Janmahasatian": "lean_janmahasatian", "James": "lean_james", "Boer": "lean_boer",
	}
	key := keys[v.in["method"]]
	if strings.HasPrefix(v.in["method"], "child standard") {
		key, age = "ideal_child", "12 years"
	}
	args := []string{"body", "--weight", or("weight", "70 kg"), "--height", height, "--sex", sex, "--age", age}
	switch v.kind {
	case "body-abw":
		key = "adjusted"
	case "body-bmi":
		key = "bmi"
	}
	return sum{args: args, key: key}
}

// wordedRows are the rows whose inputs are written in words.
func wordedRows() map[string]sum {
	neat := func(take, strength string) []string {
		return []string{"mix", "--take", take, "--strength", strength, "--make-up-to", take}
	}
	convert := func(from, to, of string) sum {
		args := []string{"convert", "--from", from, "--to", to}
		if of != "" {
			args = append(args, "--of", of)
		}
		return sum{args: args, key: "result"}
	}
	bare := func(s sum, per *big.Rat) sum {
		s.per, s.bare = per, true
		return s
	}
	return map[string]sum{
		"A065": convert("20 mL/h", "mL/min", ""),
		"A066": convert("2 mg salt", "mg base", "noradrenaline acid tartrate monohydrate"),
		"A067": convert("6.7 mg", "mmol", "sodium"),
		"A089": {args: []string{"mix", "--amount", "10 mg", "--final", "100 mL"}, key: "concentration"},
		"A114": {args: []string{"mix", "--take", "0.5 mL", "--strength", "100 units/mL", "--diluent", "49.5 mL"}, key: "concentration"},
		"A120": {args: neat("22.5 mL", "200 mg/5 mL"), key: "amount"},
		"A121": {args: neat("0.1 mL", "1.0 mg/mL"), key: "amount"},
		"A122": {args: neat("20 mL", "0.5 %"), key: "amount"},
		"A123": convert("1:1000", "mcg/mL", ""),
		"A124": convert("1:200000", "mcg/mL", ""),
		"A125": {args: neat("25 mL", "50 %"), key: "amount"},
		"A126": {args: neat("250 mL", "1.26 %"), key: "amount"},
		"A127": bare(convert("5 %", "mg/mL", ""), big.NewRat(10, 1)), // per cent is read, never written: asked the other way
		"A128": convert("50 %", "mmol/mL", "magnesium sulfate heptahydrate"),
		"A129": convert("1 g", "mmol", "magnesium in magnesium sulfate heptahydrate"),
		"A130": convert("1 g", "mmol", "calcium in calcium chloride dihydrate"), // 10 % in 10 mL
		"A131": convert("8.4 %", "mg/mL", ""),
		"A132": convert("1 mmol", "mg", "sodium"),
		"A133": bare(convert("200 mg/mL", "mmol/mL", "magnesium in magnesium chloride hexahydrate"), big.NewRat(1, 2)), // two mEq in each mmol
		"A134": bare(convert("1 mg base", "mg", "dobutamine hydrochloride"), nil),
		"A155": convert("150 pounds", "kg", ""),
		// The program knows the legal pound alone; these sources divide by 2.2. Its
		// kilograms are turned back into pounds and divided as they do.
		"A106": byBook(convert("143 pounds", "kg", "")),
		"A107": byBook(convert("60 pounds", "kg", "")),
		"A108": {args: convert("1 inch", "cm", "").args, key: "result", over: big.NewRat(55, 1), bare: true}, // inches are read, never written
		"A156": {args: []string{"flow", "--rate", "1 mL/kg/min", "--weight", "50 kg"}, key: "flow_rate"},
		"A139": {args: []string{"mix", "--each", "5 mcg/kg/min", "--weight", "6 kg", "--rule", "three"}, key: "amount"},
		// 4 °C at 2.1e-4 per °C is 0.084 % of the flask.
		"A175": {args: []string{"accuracy", "--parts", "0.06 mL, 0.09 mL, 0.084 %", "--of", "50 mL"}, key: "standard_uncertainty"},
		"A176": {args: []string{"accuracy", "--labelled", "0.5 mL", "--fluid", "mobile"}, key: "relative"},
	}
}

// byBook divides pounds by 2.2, as textbooks do.
func byBook(s sum) sum {
	s.per = new(big.Rat).Mul(big.NewRat(45359237, 100000000), big.NewRat(22, 10))
	return s
}
