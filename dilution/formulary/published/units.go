package published

import (
	"fmt"
	"math/big"
	"slices"
	"strings"
)

// A figure is a quantity as a bare number: of mg, units, mmol or mL, and per what.
type figure struct {
	text  string
	value *big.Rat
	kind  string // mg, units, mmol, mL
	per   string // "", "kg", "kg/h", "mL" …
}

func (f figure) given() bool { return f.value != nil }

// scales are what one unit is of mg, units, mmol and mL.
var scales = map[string]struct{ kind, by string }{
	"g": {"mg", "1000"}, "mg": {"mg", "1"}, "microgram": {"mg", "1/1000"}, "micrograms": {"mg", "1/1000"},
	"mcg": {"mg", "1/1000"}, "nanogram": {"mg", "1/1000000"}, "nanograms": {"mg", "1/1000000"},
	"unit": {"units", "1"}, "units": {"units", "1"}, "milliunit": {"units", "1/1000"}, "milliunits": {"units", "1/1000"},
	"mmol": {"mmol", "1"}, "micromol": {"mmol", "1/1000"}, "mL": {"mL", "1"}, "L": {"mL", "1000"},
}

// shares are what stands below the line, by what it comes to.
var shares = map[string]struct{ per, by string }{
	"kg": {"kg", "1"}, "m2": {"m2", "1"}, "h": {"h", "1"}, "min": {"h", "60"}, "day": {"h", "1/24"}, "24h": {"h", "1/24"},
	"mL": {"mL", "1"}, "L": {"mL", "1/1000"}, "g": {"g", "1"},
}

// order is that in which the shares are written.
const order = "kg m2 h mL g"

// parse reads "0.5 microgram/kg/min". A salt after the unit, "mg/mL_besilate",
// says nothing of the size.
func parse(text string) (figure, error) {
	number, unit, _ := strings.Cut(text, " ")
	unit, _, _ = strings.Cut(unit, "_")
	value, ok := new(big.Rat).SetString(number)
	parts := strings.Split(unit, "/")
	scale, known := scales[parts[0]]
	if !ok || !known {
		return figure{}, fmt.Errorf("got %q, want a number and a unit", text)
	}
	value.Mul(value, rat(scale.by))
	var per []string
	for _, p := range parts[1:] {
		share, known := shares[p]
		if !known {
			return figure{}, fmt.Errorf("got %q, whose %q is not known", text, p)
		}
		value.Mul(value, rat(share.by))
		per = append(per, share.per)
	}
	slices.SortFunc(per, func(a, b string) int { return strings.Index(order, a) - strings.Index(order, b) })
	return figure{text, value, scale.kind, strings.Join(per, "/")}, nil
}

func rat(s string) *big.Rat {
	r, ok := new(big.Rat).SetString(s)
	if !ok {
		panic("published: " + s + " is no number")
	}
	return r
}

// adult is the body, in kg, for which a figure per kg and an absolute one are
// compared.
const adult = 70

// onBody turns a figure per kg into one of a body of 70 kg, where the other is
// absolute; ok is false when the two count different things.
func (f figure) onBody(other figure) (figure, bool) {
	if f.kind != other.kind {
		return f, false
	}
	if f.per == other.per {
		return f, true
	}
	if strings.TrimSuffix("kg/"+other.per, "/") == f.per {
		return figure{f.text, new(big.Rat).Mul(f.value, big.NewRat(adult, 1)), f.kind, other.per}, true
	}
	if strings.TrimSuffix("kg/"+f.per, "/") == other.per {
		return figure{f.text, new(big.Rat).Quo(f.value, big.NewRat(adult, 1)), f.kind, other.per}, true
	}
	return f, false
}

// The rows are rounded to two or three digits: a figure passes another when it is
// more than 2 % beyond it.
var rounding = big.NewRat(2, 100)

// above reports that f is higher than g, below that it is lower, beyond rounding;
// of figures that count different things it is neither.
func (f figure) above(g figure) bool {
	ratio, ok := f.over(g)
	return ok && ratio.Cmp(new(big.Rat).Add(big.NewRat(1, 1), rounding)) > 0
}

func (f figure) below(g figure) bool { return g.above(f) }

// over is f divided by g, for a body of 70 kg where one of them is per kg.
func (f figure) over(g figure) (*big.Rat, bool) {
	on, ok := f.onBody(g)
	if !ok || on.value.Sign() == 0 || g.value.Sign() == 0 {
		return nil, false
	}
	return new(big.Rat).Quo(on.value, g.value), true
}
