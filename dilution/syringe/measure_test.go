package syringe

import (
	"errors"
	"math/big"
	"testing"

	"drawup/dilution/quantity"

	"pgregory.net/rapid"
)

func per(t *testing.T, s string) quantity.Percent {
	t.Helper()
	p, err := quantity.ParsePercent(s + " %")
	if err != nil {
		t.Fatal(err)
	}
	return p
}

// TestMeasure reads volumes on the stocked barrels, with 0.1 mL as the smallest
// measurable volume and 5 % as the farthest move. Worked by hand from the
// graduations and rules R2 and R8.
func TestMeasure(t *testing.T) {
	for _, c := range []struct {
		volume, nominal, read, moved string
		underFifth                   bool
	}{
		{"7.2", "10", "7.2", "0", false},
		{"0.1", "1", "0.1", "0", true},
		{"0.19", "1", "0.19", "0", true},
		{"0.2", "1", "0.2", "0", false},
		{"1", "1", "1", "0", false},
		{"1.01", "2", "1", "-100/101", false},
		{"2.1", "5", "2.2", "100/21", false}, // a tie goes up
		{"5", "5", "5", "0", false},
		{"5.1", "10", "5.2", "100/51", false}, // a tie goes up
		{"10.4", "20", "10", "-50/13", false},
		{"12.5", "20", "13", "4", false}, // a tie goes up
		{"20.2", "50", "20", "-100/101", false},
		{"50", "50", "50", "0", false},
	} {
		r, err := Measure(mL(t, c.volume), Stocked(), mL(t, "0.1"), per(t, "5"))
		if err != nil {
			t.Errorf("%s mL: %v", c.volume, err)
			continue
		}
		if r.Barrel.Nominal().Exact() != c.nominal || r.Volume.Exact() != c.read || r.MovedPercent.RatString() != c.moved || r.UnderFifth != c.underFifth {
			t.Errorf("%s mL: got %s mL on %s mL, moved %s %%, under a fifth %v", c.volume, r.Volume.Exact(), r.Barrel.Nominal().Exact(), r.MovedPercent.RatString(), r.UnderFifth)
		}
		if r.Tolerance.Cmp(r.Barrel.Tolerance(r.Volume)) != 0 {
			t.Errorf("%s mL: got tolerance %s mL", c.volume, r.Tolerance.Exact())
		}
	}
}

// TestMeasureRefuses gives each reason with the figures behind it (rule R8).
func TestMeasureRefuses(t *testing.T) {
	var below *BelowSmallest
	if _, err := Measure(mL(t, "0.05"), Stocked(), mL(t, "0.1"), per(t, "5")); !errors.As(err, &below) || below.Smallest.Exact() != "0.1" || below.OnGraduation.Given() {
		t.Errorf("0.05 mL: got %v", err)
	}
	if _, err := Measure(mL(t, "1.22"), Stocked(), mL(t, "1.21"), per(t, "5")); !errors.As(err, &below) || below.OnGraduation.Exact() != "1.2" {
		t.Errorf("1.22 mL, smallest 1.21 mL: got %v", err)
	}
	var none *NoBarrel
	if _, err := Measure(mL(t, "50.1"), Stocked(), mL(t, "0.1"), per(t, "5")); !errors.As(err, &none) || none.Largest.Exact() != "50" {
		t.Errorf("50.1 mL: got %v", err)
	}
	if _, err := Measure(mL(t, "1"), []Barrel{{}}, mL(t, "0.1"), per(t, "5")); !errors.As(err, &none) || none.Largest.Given() || err.Error() == "" {
		t.Errorf("no barrels: got %v", err)
	}
	var off *OffGraduation
	if _, err := Measure(mL(t, "1.05"), Stocked(), mL(t, "0.1"), per(t, "4")); !errors.As(err, &off) || off.Moved.Exact() != "1.1" || off.Percent.RatString() != "100/21" || off.Barrel.Nominal().Exact() != "2" {
		t.Errorf("1.05 mL within 4 %%: got %v", err)
	}
	if _, err := Measure(mL(t, "1.05"), Stocked(), mL(t, "0.1"), per(t, "5")); err != nil {
		t.Errorf("1.05 mL within 5 %%: got %v, want a reading", err)
	}
	if _, err := barrel(t, "50").Read(mL(t, "0.4"), mL(t, "0.1"), per(t, "100")); !errors.As(err, &off) {
		t.Errorf("0.4 mL on the 50 mL barrel reads as nothing: got %v, want it refused", err)
	}
	if _, err := barrel(t, "5").Read(mL(t, "6"), mL(t, "0.1"), per(t, "5")); !errors.As(err, &none) {
		t.Errorf("6 mL on the 5 mL barrel: got %v, want it refused", err)
	}
	if _, err := barrel(t, "5").Read(mL(t, "0.05"), mL(t, "0.1"), per(t, "5")); !errors.As(err, &below) {
		t.Errorf("0.05 mL on the 5 mL barrel: got %v, want it refused", err)
	}
}

// TestMeasureNeedsAll refuses to measure with a value missing.
func TestMeasureNeedsAll(t *testing.T) {
	v, p := mL(t, "1"), per(t, "5")
	zero := quantity.Millilitres(new(big.Rat))
	for name, err := range map[string]error{
		"volume":   second(Measure(quantity.Volume{}, Stocked(), v, p)),
		"zero":     second(Measure(zero, Stocked(), v, p)),
		"smallest": second(Measure(v, Stocked(), quantity.Volume{}, p)),
		"within":   second(barrel(t, "5").Read(v, v, quantity.Percent{})),
	} {
		var missing *quantity.NotGivenError
		if !errors.As(err, &missing) {
			t.Errorf("%s: got %v, want it refused as not given", name, err)
		}
	}
}

func second(_ Reading, err error) error { return err }

// TestFinerOfTwo takes the finer of two barrels of one capacity, whatever the
// order of the list.
func TestFinerOfTwo(t *testing.T) {
	coarse, err1 := New(mL(t, "5"), mL(t, "0.5"), "site")
	fine, err2 := New(mL(t, "5"), mL(t, "0.2"), "site")
	if err := errors.Join(err1, err2); err != nil {
		t.Fatal(err)
	}
	for _, stock := range [][]Barrel{{coarse, fine, barrel(t, "10")}, {barrel(t, "10"), fine, coarse}} {
		r, err := Measure(mL(t, "3.2"), stock, mL(t, "0.1"), per(t, "5"))
		if err != nil || r.Volume.Exact() != "3.2" || r.Barrel.Step().Exact() != "0.2" {
			t.Errorf("got %s mL, %v, want 3.2 mL on 0.2 mL lines", r.Volume.Exact(), err)
		}
	}
}

// TestReadingLaws holds every reading to what a person at the bench relies on.
func TestReadingLaws(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		v := quantity.Millilitres(big.NewRat(rapid.Int64Range(100, 50000).Draw(t, "microlitres"), 1000))
		smallest := quantity.Millilitres(big.NewRat(1, 10))
		r, err := Measure(v, Stocked(), smallest, quantity.PerCent(big.NewRat(100, 1)))
		if err != nil {
			t.Fatalf("%s mL: %v", v.Exact(), err)
		}
		step := r.Barrel.Step().Rat()
		if !new(big.Rat).Quo(r.Volume.Rat(), step).IsInt() {
			t.Fatalf("%s mL: read %s mL, which is between the lines", v.Exact(), r.Volume.Exact())
		}
		move := new(big.Rat).Sub(r.Volume.Rat(), v.Rat())
		if twice := new(big.Rat).Mul(move, big.NewRat(2, 1)); twice.Cmp(step) > 0 || twice.Cmp(new(big.Rat).Neg(step)) <= 0 {
			t.Fatalf("%s mL: read %s mL, not the nearest line with ties up", v.Exact(), r.Volume.Exact())
		}
		if r.Volume.Cmp(r.Barrel.Nominal()) > 0 {
			t.Fatalf("%s mL: read %s mL, more than the barrel holds", v.Exact(), r.Volume.Exact())
		}
		for _, b := range Stocked() {
			if b.Nominal().Cmp(v) >= 0 && b.Nominal().Cmp(r.Barrel.Nominal()) < 0 {
				t.Fatalf("%s mL: the %s mL barrel would do", v.Exact(), b.Nominal().Exact())
			}
		}
	})
}

// TestInterval holds the combination rule to worked values: u = 4.69 % and U =
// 9.4 % for 1 mL in a 2 mL barrel (5 %) made up to 10 mL in a 10 mL barrel
// (4 %) from an ampoule of 5 %, a second 1 in 10 step 5.97 %, all after GUM with
// rectangular parts. The last row is the 50 mL flask of the University of
// Tartu's GUM examples, 0.06, 0.09 and 0.042 mL in 10,000 parts of a per cent:
// u = 0.0669925 mL, so 2 u = 0.1339850.
func TestInterval(t *testing.T) {
	for _, c := range []struct {
		parts []string
		want  string
	}{
		{[]string{"5", "5", "4"}, "9.4"},
		{[]string{"5", "5", "4", "5", "4"}, "11.9"},
		{[]string{"10"}, "10"},          // 2 u would be 11.5, more than the part itself
		{[]string{"10", "0.5"}, "10.5"}, // so would 11.6
		{nil, "0"},
		{[]string{"0.05"}, "0.1"}, // a tie goes up
		{[]string{"0.04"}, "0"},
		{[]string{"600", "900", "420"}, "1339.9"},
	} {
		var parts []quantity.Percent
		for _, p := range c.parts {
			parts = append(parts, per(t, p))
		}
		got, err := Interval(parts...)
		if err != nil || got.Exact() != c.want {
			t.Errorf("%v: got %s %%, %v, want %s", c.parts, got.Exact(), err, c.want)
		}
	}
	for _, p := range []quantity.Percent{{}, quantity.PerCent(big.NewRat(-1, 1))} {
		var missing *quantity.NotGivenError
		if _, err := Interval(per(t, "5"), p); !errors.As(err, &missing) {
			t.Errorf("%s: got %v, want it refused", p.Exact(), err)
		}
	}
}

// TestIntervalEncloses holds the rounded half width to the second route's
// rule: both 2 u and the plain sum reach its lower edge, and not both its upper.
func TestIntervalEncloses(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		hundredths := rapid.SliceOfN(rapid.Int64Range(1, 5000), 1, 5).Draw(t, "parts")
		var parts []quantity.Percent
		sum, square := new(big.Rat), new(big.Rat)
		for _, n := range hundredths {
			a := big.NewRat(n, 100)
			parts = append(parts, quantity.PerCent(a))
			sum.Add(sum, a)
			square.Add(square, new(big.Rat).Mul(new(big.Rat).Mul(a, a), big.NewRat(4, 3)))
		}
		p, err := Interval(parts...)
		if err != nil {
			t.Fatal(err)
		}
		reach := func(edge *big.Rat) bool {
			return sum.Cmp(edge) >= 0 && (edge.Sign() <= 0 || square.Cmp(new(big.Rat).Mul(edge, edge)) >= 0)
		}
		half := big.NewRat(5, 100)
		if !reach(new(big.Rat).Sub(p.Rat(), half)) || reach(new(big.Rat).Add(p.Rat(), half)) {
			t.Fatalf("%v: got %s %%", hundredths, p.Exact())
		}
	})
}
