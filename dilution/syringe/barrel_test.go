package syringe

import (
	"errors"
	"math/big"
	"testing"

	"drawup/dilution/quantity"
)

func mL(t *testing.T, s string) quantity.Volume {
	t.Helper()
	v, err := quantity.ParseVolume(s + " mL")
	if err != nil {
		t.Fatal(err)
	}
	return v
}

func barrel(t *testing.T, nominal string) Barrel {
	t.Helper()
	b, ok := Find(mL(t, nominal))
	if !ok {
		t.Fatalf("no %s mL barrel", nominal)
	}
	return b
}

// TestTolerance holds ISO 7886-1:1993, table 1. Row A174, the 10 mL barrel at
// 4 mL, and the rule for the 1 mL barrel are printed in Phillips, Syringe
// accuracy estimates for ISO 7886-1, 2016; the other rows were worked from the
// table by hand.
func TestTolerance(t *testing.T) {
	for _, c := range []struct{ nominal, volume, tolerance, percent string }{
		{"10", "4", "0.19", "4.75"},
		{"1", "0.1", "0.017", "17"},
		{"1", "0.2", "0.019", "9.5"},
		{"1", "0.5", "0.025", "5"},
		{"2", "0.2", "0.034", "17"},
		{"2", "1", "0.05", "5"},
		{"5", "1", "0.085", "8.5"},
		{"5", "2.5", "0.1", "4"},
		{"10", "1", "0.16", "16"},
		{"10", "5", "0.2", "4"},
		{"20", "2", "0.32", "16"},
		{"50", "5", "0.8", "16"},
		{"50", "25", "1", "4"},
		{"50", "50", "2", "4"},
	} {
		b := barrel(t, c.nominal)
		v := mL(t, c.volume)
		got := b.Tolerance(v)
		if got.Exact() != c.tolerance {
			t.Errorf("%s mL barrel, %s mL: got %s mL, want %s", c.nominal, c.volume, got.Exact(), c.tolerance)
		}
		if p := (Reading{Barrel: b, Volume: v, Tolerance: got}).Relative(); p.Exact() != c.percent {
			t.Errorf("%s mL barrel, %s mL: got %s %%, want %s", c.nominal, c.volume, p.Exact(), c.percent)
		}
	}
}

// TestToleranceOfNothing gives none where there is nothing to read.
func TestToleranceOfNothing(t *testing.T) {
	b := barrel(t, "10")
	for name, v := range map[string]quantity.Volume{
		"more than the barrel": b.Tolerance(mL(t, "10.2")),
		"no volume":            b.Tolerance(quantity.Volume{}),
		"no barrel":            Barrel{}.Tolerance(mL(t, "1")),
	} {
		if v.Given() {
			t.Errorf("%s: got %s mL, want none", name, v.Exact())
		}
	}
	if (Reading{}).Relative().Given() {
		t.Error("the zero reading has a tolerance")
	}
}

// TestGraduations holds the graduations that were read: 1 mL in 0.01, 3 mL in
// 0.1, 5 and 10 mL in 0.2 (how to read a syringe, quoting a technical
// university); 30 and 50 mL in 1 mL (a hospital unit's abstract on syringe
// sampling). 2 and 20 mL are common practice without a source and say so. None
// is coarser than ISO 7886-1:1993, table 1 allows (0.05, 0.2, 0.5, 1, 2 and
// 5 mL; that column is from memory).
func TestGraduations(t *testing.T) {
	for _, c := range []struct {
		nominal, step, coarsest string
		sourced                 bool
	}{
		{"1", "0.01", "0.05", true}, {"2", "0.1", "0.2", false}, {"3", "0.1", "0.2", true}, {"5", "0.2", "0.5", true},
		{"10", "0.2", "1", true}, {"20", "1", "2", false}, {"30", "1", "2", true}, {"50", "1", "5", true},
	} {
		b := barrel(t, c.nominal)
		if b.Step().Exact() != c.step || b.Step().Cmp(mL(t, c.coarsest)) > 0 {
			t.Errorf("%s mL barrel: got steps of %s mL, want %s", c.nominal, b.Step().Exact(), c.step)
		}
		if (b.Source() != noSource) != c.sourced {
			t.Errorf("%s mL barrel: got source %q, want sourced %v", c.nominal, b.Source(), c.sourced)
		}
	}
}

// TestLists holds the order on which Measure relies: rising capacity, and no
// larger barrel more finely graduated than a smaller one.
func TestLists(t *testing.T) {
	if len(Known()) != 8 || len(Stocked()) != 6 {
		t.Fatalf("got %d known and %d stocked barrels, want 8 and 6", len(Known()), len(Stocked()))
	}
	for _, list := range [][]Barrel{Known(), Stocked()} {
		for i, b := range list {
			if _, err := New(b.Nominal(), b.Step(), b.Source()); err != nil {
				t.Error(err)
			}
			if i > 0 && (list[i-1].Nominal().Cmp(b.Nominal()) >= 0 || list[i-1].Step().Cmp(b.Step()) > 0) {
				t.Errorf("the %s mL barrel is out of order", b.Nominal().Exact())
			}
		}
	}
	for _, v := range []quantity.Volume{mL(t, "7"), {}} {
		if _, ok := Find(v); ok {
			t.Errorf("found a barrel of %v, want none", v)
		}
	}
}

// TestNewRefuses refuses capacities and graduations that make no barrel.
func TestNewRefuses(t *testing.T) {
	zero := quantity.Millilitres(new(big.Rat))
	for name, c := range map[string][2]quantity.Volume{
		"no capacity": {{}, mL(t, "1")}, "no step": {mL(t, "10"), {}}, "zero step": {mL(t, "10"), zero},
		"zero capacity": {zero, mL(t, "1")}, "not a multiple": {mL(t, "10"), mL(t, "0.3")},
	} {
		var wrong *BarrelError
		if b, err := New(c[0], c[1], ""); !errors.As(err, &wrong) || err.Error() == "" || b.Given() {
			t.Errorf("%s: got %v, %v, want it refused", name, b, err)
		}
	}
}
