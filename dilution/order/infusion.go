package order

import (
	"fmt"
	"strings"

	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// infusion reads one syringe for a pump.
func (r *reader) infusion(patient int, path []any, s infusionRecord) Syringe {
	out := r.common(patient, path, s.commonRecord)
	out.Infusion = true
	out.Standard = r.text(s.Standard, at(path, "standard"))
	out.Method = read(r, s.Method, parseMethod, at(path, "method"))
	out.Line = read(r, s.Line, parseLine, at(path, "line"))
	out.Start, out.RateBy = dosed(r, s.Start, quantity.ParseDoseRate, at(path, "start"))
	out.From = read(r, s.From, quantity.ParseDoseRate, at(path, "from"))
	out.To = read(r, s.To, quantity.ParseDoseRate, at(path, "to"))
	mix := read(r, s.Mix, parseMix, at(path, "mix"))
	out.MixAmount = Field[quantity.Amount]{Value: mix.Value.amount, Text: mix.Text, Pos: mix.Pos}
	out.MixVolume = Field[quantity.Volume]{Value: mix.Value.volume, Text: mix.Text, Pos: mix.Pos}
	out.Concentration = read(r, s.Concentration, quantity.ParseConcentration, at(path, "concentration"))
	out.Volume = read(r, s.Volume, quantity.ParseVolume, at(path, "volume"))
	out.Hours = read(r, s.Hours, parseSpan, at(path, "hours"))
	out.Priming = read(r, s.Priming, quantity.ParseVolume, at(path, "priming"))
	out.DeadSpace = read(r, s.DeadSpace, quantity.ParseVolume, at(path, "dead_space"))
	out.Mixture = read(r, s.Mixture, parseRule, at(path, "mixture"))
	out.Each = read(r, s.Each, quantity.ParseDoseRate, at(path, "one_ml_per_hour"))
	r.oneMixture(path, out)
	r.mixtureKeys(path)
	r.methodFits(path, out)
	r.required(r.places.Has(at(path, "start")...), path, "start", r.here(), `start = "0.05 microgram/kg/min"`)
	r.ratesFit(path, out)
	if out.Start.Value.Given() {
		r.bodyFor(at(path, "start"), patient, out.Start.Value.Basis(), out.RateBy)
	}
	return out
}

// oneMixture refuses an infusion that says in two ways, or in none, what the
// syringe is to hold.
func (r *reader) oneMixture(path []any, s Syringe) {
	var ways []string
	for _, name := range []string{"standard", "mix", "mixture", "concentration"} {
		there := r.places.Has(at(path, name)...)
		if name == "standard" {
			there = s.Standard.Given() || r.unread(at(path, name))
		}
		if there {
			ways = append(ways, name)
		}
	}
	switch {
	case len(ways) > 1:
		names := map[string]string{"standard": "a standard preparation", "mix": "a mixture of its own", "mixture": "a mixture made for one weight", "concentration": "a concentration"}
		second := ways[1]
		r.refuse(at(path, second), refusal.Reason{Code: refusal.KeyConflict, Got: ways[0] + " and " + second, Want: "one of the two",
			Message: r.here() + " names " + names[ways[0]] + " and " + names[second], Remedy: "take one of them out"})
	case len(ways) == 0 && !r.places.Has(at(path, "hours")...):
		r.refuse(path, refusal.Reason{Code: refusal.KeyMissing, Got: "no standard, no mix", Want: "one of standard, mix, mixture and concentration, or hours alone",
			Message: r.here() + " does not say what the syringe is to hold", Remedy: `add a line such as: standard = "4 mg in 50 mL"`})
	}
}

// mixtureKeys refuses keys that go with a way of mixing which is not there.
func (r *reader) mixtureKeys(path []any) {
	has := func(name string) bool { return r.places.Has(at(path, name)...) }
	if has("concentration") && !has("volume") && !has("hours") {
		r.refuse(at(path, "volume"), refusal.Reason{Code: refusal.KeyMissing, Message: r.here() + " has a concentration, and neither a volume nor hours to make it for",
			Got: "no volume, no hours", Want: "one of the two", Remedy: `add a line such as: volume = "50 mL", or: hours = "12 h"`})
	}
	for _, k := range []struct {
		name, with string
		fits       bool
	}{
		{"volume", "concentration or mixture", has("concentration") || has("mixture")},
		{"one_ml_per_hour", "mixture", has("mixture")},
	} {
		if has(k.name) && !k.fits {
			r.refuse(at(path, k.name), refusal.Reason{Code: refusal.KeyConflict, Got: k.name, Want: k.name + " with " + k.with,
				Message: fmt.Sprintf("%s has %q, which goes with %s only", r.here(), k.name, k.with), Remedy: "take it out"})
		}
	}
}

// methodFits refuses a bag for a mixture whose volume is not the bag's own.
func (r *reader) methodFits(path []any, s Syringe) {
	if !s.Method.Given() || s.Method.Value == "" || s.Method.Value == MakeUpTo {
		return
	}
	why := ""
	switch {
	case s.Method.Value == AddTo && s.Concentration.Given():
		why = "the drug's own volume comes on top of the bag, so that the bag ends up weaker than the concentration"
	case s.Method.Value == AddTo && s.Mixture.Given():
		why = "the drug's own volume comes on top of the bag, so that 1 mL/h no longer gives what the rule says"
	case s.Hours.Given() && !s.Volume.Given() && !s.Standard.Given() && !s.MixAmount.Given():
		why = "how much is made follows from the hours, and a bag has the volume it has"
	}
	if why == "" {
		return
	}
	r.refuse(at(path, "method"), refusal.Reason{Code: refusal.KeyConflict, Got: s.Method.Text, Want: MakeUpTo, Rule: "R5",
		Message: fmt.Sprintf("%s cannot be made by %q: %s", r.here(), s.Method.Value, why), Remedy: `write mix = "… in …" for a bag, or take the method out`})
}

// parseRule reads the rule of a mixture made for one weight.
func parseRule(s string) (string, error) {
	switch word := strings.ToLower(strings.TrimSpace(s)); word {
	case RuleOfSix, RuleOfThree:
		return word, nil
	}
	return "", &wordError{s, fmt.Sprintf("%q or %q", RuleOfSix, RuleOfThree)}
}
