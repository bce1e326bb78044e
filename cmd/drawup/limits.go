package main

import (
	"strings"

	"drawup/dilution"
	"drawup/dilution/body"
	"drawup/dilution/formulary"
	"drawup/dilution/refusal"
)

// limitFlags are the flags that hold a quick sum against the formulary.
func limitFlags() []flagSpec {
	return []flagSpec{
		{"drug", "etomidate", "hold the sum against the formulary's limits for this drug"},
		{"use", "bolus", "with --drug: bolus or infusion, where the command leaves it open"},
		{"indication", "induction", "with --drug: what it is for, where the limits depend on it"},
		{"age", "54 years", "with --drug: the patient's age, where the limits depend on it"},
		{"route", "IV", "with --drug: the route, IV unless given"},
		{"line", "central", "with --drug: peripheral or central, peripheral unless given"},
		{"fluid", "sodium chloride 0.9 %", "with --drug: the diluent's name"},
		{"formulary", "my-site.toml", "with --drug: the site's own formulary file, over the starter"},
	}
}

// checkLimits holds q against the formulary when --drug is given, and says
// that no limits were checked when it is not.
// It returns what the row says that the sum was held against.
func (r *request) checkLimits(q dilution.Quick) dilution.QuickLimits {
	var limits dilution.QuickLimits
	if !r.given("drug") {
		r.forbid("it goes with --drug", "use", "indication", "age", "route", "line", "fluid", "presentation", "formulary")
		r.noLimits()
		return limits
	}
	q, f, ok := r.quick(q)
	if !ok {
		return limits
	}
	reasons, limits := q.Check(f)
	r.faults = append(r.faults, inFlags(reasons)...)
	if !r.refused() {
		r.limitsNote(q, f, limits)
	}
	return limits
}

// quick fills q with what the flags of the formulary say; false when they cannot
// be read.
func (r *request) quick(q dilution.Quick) (dilution.Quick, *formulary.Formulary, bool) {
	q.Drug, q.Indication = r.texts["drug"].text, r.texts["indication"].text
	q.Route, q.Line = r.texts["route"].text, r.texts["line"].text
	q.Diluent, q.Style = r.texts["fluid"].text, r.style
	q.Age = read(r, "age", body.ParseAge)
	r.oneOf("line", "peripheral", "central")
	if !r.readUse(&q) || r.refused() {
		return q, nil, false
	}
	f, ok := r.formulary()
	return q, f, ok
}

// formulary is the starter, with the site's own file over it where one is named,
// read once for each request.
func (r *request) formulary() (*formulary.Formulary, bool) {
	if r.stored == nil {
		var own formularyFlags
		if r.given("formulary") {
			own.files = strings.Split(r.texts["formulary"].text, ",")
		}
		lib, faults := libraryOf(own)
		r.faults = append(r.faults, faults...)
		if faults.Refused() {
			return nil, false
		}
		r.stored = lib.form
	}
	return r.stored, true
}

// inFlags words reasons that speak of an order file for a command line.
func inFlags(reasons refusal.List) refusal.List {
	words := strings.NewReplacer(
		"write diluent = one of:", "add --fluid, one of:", "write presentation = one of:", "add --presentation, one of:",
		"write indication = one of:", "add --indication, one of:", "write route = one of:", "add --route, one of:",
		"write line = \"central\"", "add --line central", "write the patient's age", `add --age "54 years"`,
		"order a concentration and a volume", "dilute it before use: --final, or --take with one of the four ways",
		"measure it and write it into the order", "measure it and add it as a flag",
		"and the patient has none", "and no age is given", "which the order does not give", "which no flag gives",
		"the order does not say", "the command does not say",
		"write accepted_by and accepted_reason, which are printed", "order it: an order takes a name and a reason, and prints both",
	)
	flags := map[string]string{
		"diluent": "--fluid", "presentation": "--presentation", "indication": "--indication", "route": "--route", "patient.age": "--age",
		"drug": "--drug", "patient": "patient",
	}
	out := append(refusal.List(nil), reasons...)
	for i := range out {
		out[i].Message, out[i].Remedy = words.Replace(out[i].Message), words.Replace(out[i].Remedy)
		if flag, ok := flags[out[i].Field]; ok {
			out[i].Field = flag
		}
	}
	return out
}

// readUse settles bolus or infusion: a dose rate is an infusion, a dose a
// bolus; a mixture says which.
func (r *request) readUse(q *dilution.Quick) bool {
	if !r.given("use") {
		return true
	}
	if !r.oneOf("use", "bolus", "infusion") {
		return false
	}
	infusion := r.texts["use"].text == "infusion"
	if (q.Dose.Given() && infusion) || (q.Rate.Given() && !infusion) {
		r.add(refusal.Reason{
			Code: refusal.FlagConflict, Field: "--use",
			Got: r.texts["use"].text, Want: "the use that the command is for",
			Message: "--use contradicts the command: a dose is a bolus, a dose rate an infusion",
			Remedy:  "leave --use out",
		})
		return false
	}
	q.Infusion = infusion
	return true
}

// oneOf refuses a text that is not one of the words.
func (r *request) oneOf(name string, words ...string) bool {
	if !r.given(name) {
		return true
	}
	for _, w := range words {
		if r.texts[name].text == w {
			return true
		}
	}
	r.add(refusal.Reason{
		Code: refusal.ValueUnknown, Field: "--" + name,
		Got: r.texts[name].text, Want: words[0] + " or " + words[1],
		Rule:    "R10",
		Message: "--" + name + ": got " + r.texts[name].text + ", want " + words[0] + " or " + words[1],
		Remedy:  "write one of the two",
	})
	return false
}

// limitsNote says what was checked, and what a quick sum cannot know.
func (r *request) limitsNote(q dilution.Quick, f *formulary.Formulary, limits dilution.QuickLimits) {
	words := "checked against " + f.Name + " " + f.Version + ": " + f.State()
	if q.Weight.Given() && limits.By != body.None && limits.By != 0 {
		words += "; an order would go by " + limits.By.String() + " weight, and the weight given is taken as that"
	}
	if !q.Dose.Given() && !q.Rate.Given() {
		words += "; its concentration was checked, no dose"
	}
	remedy := "an order file checks presentation, diluent, weight and stability as well"
	if q.Mix != nil {
		remedy = "an order file checks dose, weight and stability as well"
	}
	r.caution(refusal.Reason{
		Code: refusal.QuickCheck, Field: "--drug",
		Got: q.Drug, Rule: "R13",
		Message: words,
		Remedy:  remedy,
	})
}
