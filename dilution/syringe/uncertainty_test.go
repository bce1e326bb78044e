package syringe

import (
	"math/big"
	"testing"

	"drawup/dilution/quantity"
)

func widths(shape Shape, percents ...string) []Width {
	var out []Width
	for _, p := range percents {
		r, _ := new(big.Rat).SetString(p)
		out = append(out, Width{quantity.PerCent(r), shape})
	}
	return out
}

// TestFlask is row A175 (University of Tartu, GUM example file of a 50 mL flask,
// which states u = 0.0669925 mL): 0.06 and 0.09 mL, and 4 °C at 2.1e-4 per °C,
// all rectangular; in per cent of 50 mL 0.12, 0.18 and 0.084.
func TestFlask(t *testing.T) {
	u, err := Combine(widths(Rectangular, "0.12", "0.18", "0.084")...)
	if err != nil {
		t.Fatal(err)
	}
	ml := new(big.Rat).Mul(u.Standard.Rat(), big.NewRat(1, 2))
	if got := ml.FloatString(7); got != "0.0669925" {
		t.Errorf("got %s mL, want 0.0669925", got)
	}
}

// TestWorkedUncertainties are worked by hand from the GUM's rule: 1 mL on a 2 mL
// barrel (5 %) made up to 10 mL (4 %) from an ampoule of 5 % is the root of (25 +
// 25 + 16)/3, 4.69 %; a second step of 5 and 4 % makes it 5.97 %. The last row is
// example A1 of the Eurachem/CITAC guide to uncertainty, from memory: 100.28 mg
// (0.05), purity 0.9999 (0.000058), 100.0 mL (0.07) give 0.9 in 1002.7 mg/L.
func TestWorkedUncertainties(t *testing.T) {
	for _, c := range []struct {
		name                      string
		widths                    []Width
		standard, expanded, worst string
	}{
		{"one step", widths(Rectangular, "5", "5", "4"), "4.69", "9.38", "14.00"},
		{"two steps", widths(Rectangular, "5", "5", "4", "5", "4"), "5.97", "11.94", "23.00"},
		{"triangular", widths(Triangular, "6"), "2.45", "4.90", "6.00"},
		{"nothing wide", widths(Rectangular, "0"), "0.00", "0.00", "0.00"},
		{"standard", widths(Standard, "3", "4"), "5.00", "10.00", ""},
		{"Eurachem A1", widths(Standard, "500/10028", "58/9999", "7/100"), "0.09", "0.17", ""},
	} {
		u, err := Combine(c.widths...)
		if err != nil {
			t.Fatal(c.name, err)
		}
		worst := ""
		if u.Worst.Given() {
			worst = u.Worst.Rat().FloatString(2)
		}
		if s, e := u.Standard.Rat().FloatString(2), u.Expanded.Rat().FloatString(2); s != c.standard || e != c.expanded || worst != c.worst {
			t.Errorf("%s: got %s, %s, %q, want %s, %s, %q", c.name, s, e, worst, c.standard, c.expanded, c.worst)
		}
	}
}

func TestCombineRefuses(t *testing.T) {
	for name, w := range map[string][]Width{
		"nothing": nil, "no shape": widths(0, "5"), "below zero": widths(Rectangular, "-5"), "no width": {{Shape: Standard}},
	} {
		if _, err := Combine(w...); err == nil {
			t.Errorf("%s: got no error", name)
		}
	}
}
