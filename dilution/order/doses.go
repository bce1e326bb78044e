package order

import (
	"fmt"
	"strconv"

	"drawup/dilution/refusal"
)

// mostDoses bounds how many doses one syringe may hold: our own bound, wide and
// against slips of the pen.
const mostDoses = 100

const wantCount = "a whole number from 1 to 100 such as: doses = 4"

// count reads how many doses a syringe is to hold.
func (r *reader) count(v any, path []any) Field[int] {
	return r.whole(v, path, mostDoses, wantCount, "a syringe for no dose holds nothing")
}

// whole reads a whole number from 1 to most, bare or in quotes. none is what to
// say of nought.
func (r *reader) whole(v any, path []any, most int, want, none string) Field[int] {
	f := Field[int]{Pos: r.places.Of(path...)}
	if v == nil || r.broken[f.Pos.Line] {
		return f
	}
	switch v := v.(type) {
	case int64:
		f.Text = strconv.FormatInt(v, 10)
	case string:
		f.Text = v
	default:
		r.refuse(path, refusal.Reason{Code: refusal.ValueWrongType, Got: fmt.Sprint(v), Want: want,
			Message: fmt.Sprintf("the value of %q is not a whole number", key(path)), Remedy: "write " + want})
		return f
	}
	n, err := strconv.Atoi(f.Text)
	switch {
	case err != nil || strconv.Itoa(n) != f.Text || n < 0 || n > most:
		r.refuse(path, refusal.Reason{Code: refusal.ValueUnknown, Got: shown(f.Text), Want: want,
			Message: fmt.Sprintf("%q is not a number that the key %q can have", f.Text, key(path)), Remedy: "write " + want})
	case n == 0:
		r.refuse(path, refusal.Reason{Code: refusal.QuantityZero, Got: f.Text, Want: want, Rule: "R1", Message: none, Remedy: "write " + want})
	default:
		f.Value = n
	}
	return f
}

// shown is a text, or "nothing" for an empty one.
func shown(s string) string {
	if s == "" {
		return "nothing"
	}
	return s
}

// several refuses a number of doses, and leave to dilute, beside keys that say
// otherwise.
func (r *reader) several(path []any, dilute bool) {
	has := func(name string) bool { return r.places.Has(at(path, name)...) }
	conflict := func(name, message, want, remedy string) {
		r.refuse(at(path, name), refusal.Reason{Code: refusal.KeyConflict, Message: message, Got: name, Want: want, Remedy: remedy})
	}
	if has("doses") {
		switch {
		case !has("dose"):
			conflict("doses", r.here()+" counts doses, and has no dose to count", "doses beside a dose", "write the dose as well")
		case has("amount"):
			conflict("amount", r.here()+" says how many doses it holds, and an amount besides", "doses with a dose, and with one of concentration and volume at most",
				"take the amount out")
		case has("concentration") && has("volume"):
			conflict("volume", r.here()+" says how many doses it holds, how strong it is, and a volume besides",
				"doses with a dose, and with one of concentration and volume at most", "take the volume out, or the number of doses")
		}
	}
	if !dilute {
		return
	}
	for _, name := range []string{"amount", "concentration", "volume", "doses"} {
		if has(name) {
			conflict("dilute_if_needed", r.here()+" leaves the dilution to the planner, and names its own", "dilute_if_needed beside a dose alone",
				"take "+name+" out, or dilute_if_needed")
			return
		}
	}
}
