package pump

import (
	"errors"
	"math/big"
	"strconv"
	"strings"
	"testing"

	"drawup/dilution/quantity"

	"pgregory.net/rapid"
)

// TestRefused names what is missing or does not go together.
func TestRefused(t *testing.T) {
	noWeight, noSurface := PerWeight(quantity.BodyWeight{}), PerSurface(quantity.BodySurfaceArea{})
	zero := PerWeight(quantity.Kilograms(new(big.Rat)))
	perKg, whole, perM2 := dose(t, "0.1 microgram/kg/min"), dose(t, "5 mg/h"), dose(t, "2 g/m2/day")
	c := conc(t, "1 mg/mL")
	var missing *quantity.NotGivenError
	var basis *quantity.BasisError
	var kind *quantity.KindError
	for _, x := range []struct {
		name string
		dose quantity.DoseRate
		per  Per
		c    quantity.Concentration
		want any
	}{
		{"no dose", quantity.DoseRate{}, PerNothing(), c, &missing},
		{"no concentration", whole, PerNothing(), quantity.Concentration{}, &missing},
		{"concentration of zero", whole, PerNothing(), c.Scaled(new(big.Rat)), &missing},
		{"no weight", perKg, noWeight, c, &missing},
		{"weight of zero", perKg, zero, c, &missing},
		{"no surface", perM2, noSurface, c, &missing},
		{"zero Per", whole, Per{}, c, &basis},
		{"per kg without weight", perKg, PerNothing(), c, &basis},
		{"absolute with weight", whole, by(t, "70 kg"), c, &basis},
		{"per m² with weight", perM2, by(t, "70 kg"), c, &basis},
		{"mass against units", whole, PerNothing(), conc(t, "1 unit/mL"), &kind},
		{"mass against mmol", perKg, by(t, "70 kg"), conc(t, "1 mmol/mL"), &kind},
	} {
		if _, err := Flow(x.dose, x.per, x.c); !errors.As(err, x.want) {
			t.Errorf("%s: got %v from dose to flow", x.name, err)
		}
		if _, err := Delivered(step(t, "5"), x.per, x.c, x.dose); !errors.As(err, x.want) {
			t.Errorf("%s: got %v from flow to dose", x.name, err)
		}
	}
	if _, err := Delivered(quantity.FlowRate{}, PerNothing(), c, whole); !errors.As(err, &missing) {
		t.Errorf("no flow: got %v", err)
	}
	if _, err := Set(whole, PerNothing(), c, quantity.FlowRate{}); !errors.As(err, &missing) {
		t.Errorf("no step: got %v", err)
	}
	if _, err := Slips(whole, PerNothing(), c, quantity.FlowRate{}); !errors.As(err, &missing) {
		t.Errorf("no step for slips: got %v", err)
	}
}

// TestDirections rounds one flow three ways. 0.1 microgram/kg/min of 4 mg in
// 50 mL at 72 kg is 5.4 mL/h exactly; at 71 kg it is 5.325 mL/h (by hand: 0.1 x
// 71 x 60 / 80).
func TestDirections(t *testing.T) {
	d, c, s := dose(t, "0.1 microgram/kg/min"), conc(t, "4 mg in 50 mL"), step(t, "0.1")
	type setter func(quantity.DoseRate, Per, quantity.Concentration, quantity.FlowRate) (Setting, error)
	for _, x := range []struct {
		name         string
		set          setter
		weight, rate string
		lost         string
	}{
		{"half up", Set, "72 kg", "5.4", "0"},
		{"down", SetNotAbove, "72 kg", "5.4", "0"},
		{"up", SetNotBelow, "72 kg", "5.4", "0"},
		{"half up", Set, "71 kg", "5.3", "-100/213"},
		{"down", SetNotAbove, "71 kg", "5.3", "-100/213"},
		{"up", SetNotBelow, "71 kg", "5.4", "100/71"},
	} {
		got, err := x.set(d, by(t, x.weight), c, s)
		if err != nil || got.Rate.Exact() != x.rate || got.LostPercent.RatString() != x.lost {
			t.Errorf("%s, %s: got %s mL/h, lost %v %%, %v, want %s, %s", x.name, x.weight, got.Rate.Exact(), got.LostPercent, err, x.rate, x.lost)
		}
	}
}

// TestBelowStep refuses a rate that would be set as nothing, and lets the next
// step up stand where a lower limit is rounded up.
func TestBelowStep(t *testing.T) {
	d, c := dose(t, "1 microgram/h"), conc(t, "1 mg/mL") // 0.001 mL/h
	var below *BelowStep
	for _, f := range []func(quantity.DoseRate, Per, quantity.Concentration, quantity.FlowRate) (Setting, error){Set, SetNotAbove} {
		if _, err := f(d, PerNothing(), c, step(t, "0.1")); !errors.As(err, &below) || below.Exact.Exact() != "0.001" || below.Step.Exact() != "0.1" {
			t.Errorf("got %v, want it refused as below the step", err)
		}
	}
	if s, err := SetNotBelow(d, PerNothing(), c, step(t, "0.1")); err != nil || s.Rate.Exact() != "0.1" {
		t.Errorf("got %s, %v, want 0.1 mL/h", s.Rate.Exact(), err)
	}
	if s, err := Set(dose(t, "50 microgram/h"), PerNothing(), c, step(t, "0.1")); err != nil || s.Rate.Exact() != "0.1" {
		t.Errorf("a tie at half a step: got %s, %v, want 0.1 mL/h", s.Rate.Exact(), err)
	}
}

// TestQuantisation follows half a step over the rate: 0.05 of 1.1 mL/h is 4.5 %,
// of 10 mL/h 0.5 % (worked from the definition).
func TestQuantisation(t *testing.T) {
	for _, x := range []struct{ dose, rate, lost string }{
		{"1.05 mg/h", "1.1", "4.8"}, {"1.15 mg/h", "1.2", "4.3"}, {"10.05 mg/h", "10.1", "0.5"},
	} {
		s, err := Set(dose(t, x.dose), PerNothing(), conc(t, "1 mg/mL"), step(t, "0.1"))
		if err != nil || s.Rate.Exact() != x.rate || s.LostPercent.FloatString(1) != x.lost || s.Delivered.Exact() != x.rate {
			t.Errorf("%s: got %s mL/h, lost %v %%, delivered %s, %v", x.dose, s.Rate.Exact(), s.LostPercent, s.Delivered.Exact(), err)
		}
	}
}

// TestSlips works the slips by hand: 0.1 microgram/kg/min of 4 mg in 50 mL at
// 72 kg is 5.4 mL/h; 60 times, a sixtieth (0.09), ten times, a tenth (0.54),
// and 72 kg entered as 158.7 lb, 5.4/0.45359237 = 11.90 mL/h.
func TestSlips(t *testing.T) {
	s, err := Slips(dose(t, "0.1 microgram/kg/min"), by(t, "72 kg"), conc(t, "4 mg in 50 mL"), step(t, "0.1"))
	want := "per minute for per hour 324; per hour for per minute 0.1; ten times 54; a tenth 0.5; pounds for kilograms 11.9"
	if got := slipText(s); err != nil || got != want {
		t.Errorf("got %s, %v, want %s", got, err, want)
	}
	s, err = Slips(dose(t, "0.1 microgram/kg/min"), by(t, "72 kg"), conc(t, "4 mg in 50 mL"), step(t, "0.0001"))
	want = "per minute for per hour 324; per hour for per minute 0.09; ten times 54; a tenth 0.54; pounds for kilograms 11.905"
	if got := slipText(s); err != nil || got != want {
		t.Errorf("on a fine step: got %s, %v, want %s", got, err, want)
	}
	s, err = Slips(dose(t, "0.4 mg/h"), PerNothing(), conc(t, "1 mg/mL"), step(t, "0.1"))
	want = "per minute for per hour 24; ten times 4"
	if got := slipText(s); err != nil || got != want {
		t.Errorf("absolute, a sixtieth and a tenth round to nothing: got %s, %v, want %s", got, err, want)
	}
	var missing *quantity.NotGivenError
	if _, err := Slips(quantity.DoseRate{}, PerNothing(), conc(t, "1 mg/mL"), step(t, "0.1")); !errors.As(err, &missing) {
		t.Errorf("no dose: got %v", err)
	}
}

func slipText(list []SlipReading) string {
	var parts []string
	for _, s := range list {
		parts = append(parts, s.Kind+" "+s.Rate.Exact())
	}
	return strings.Join(parts, "; ")
}

// TestLadder works spacings by hand from the rule: 6 to 12 rungs on multiples
// of 1, 2, 2.5 or 5 x 10^n, both ends where they are multiples.
func TestLadder(t *testing.T) {
	for _, x := range []struct {
		from, to string
		rungs    int
		by, mix  string
		want     string
	}{
		{"0.05 microgram/kg/min", "0.5 microgram/kg/min", 10, "72 kg", "4 mg in 50 mL",
			"0.05 0.1 0.15 0.2 0.25 0.3 0.35 0.4 0.45 0.5"},
		{"0.02 microgram/kg/min", "0.3 microgram/kg/min", 12, "72 kg", "4 mg in 50 mL",
			"0.025 0.05 0.075 0.1 0.125 0.15 0.175 0.2 0.225 0.25 0.275 0.3"},
		{"0.02 microgram/kg/min", "0.3 microgram/kg/min", 6, "72 kg", "4 mg in 50 mL",
			"0.05 0.1 0.15 0.2 0.25 0.3"},
		{"5 mg/h", "15 mg/h", 8, "", "0.1 mg/mL", "5 6 7 8 9 10 11 12 13 14 15"},
		{"500 units/h", "2000 units/h", 7, "", "1000 units/mL", "500 750 1000 1250 1500 1750 2000"},
		{"100 mg/h", "1 g/h", 10, "", "10 mg/mL", "100 200 300 400 500 600 700 800 900 1000"},
		{"7 mg/h", "31 mg/h", 6, "", "10 mg/mL", "7.5 10 12.5 15 17.5 20 22.5 25 27.5 30"},
		{"1 mg/min", "120 mg/h", 6, "", "10 mg/mL", "1 1.2 1.4 1.6 1.8 2"},
	} {
		list, err := Ladder(dose(t, x.from), dose(t, x.to), x.rungs, by(t, x.by), conc(t, x.mix), step(t, "0.1"))
		var got []string
		for _, s := range list {
			got = append(got, s.Dose.Exact())
			if s.Dose.Unit().String() != dose(t, x.from).Unit().String() || s.Dose.Period() != dose(t, x.from).Period() {
				t.Errorf("%s to %s: a rung in another unit", x.from, x.to)
			}
		}
		if text := strings.Join(got, " "); err != nil || text != x.want {
			t.Errorf("%s to %s, %d rungs: got %s, %v, want %s", x.from, x.to, x.rungs, text, err, x.want)
		}
	}
}

// TestLadderRefused refuses ranges on which no ladder stands.
func TestLadderRefused(t *testing.T) {
	c, s := conc(t, "1 mg/mL"), step(t, "0.1")
	var wrong *RangeError
	for _, x := range []struct {
		from, to string
		rungs    int
	}{
		{"5 mg/h", "5 mg/h", 8}, {"6 mg/h", "5 mg/h", 8}, {"5 mg/h", "6 mg/h", 5}, {"5 mg/h", "6 mg/h", 13},
		{"1000 mg/h", "1000.5 mg/h", 8},
	} {
		if _, err := Ladder(dose(t, x.from), dose(t, x.to), x.rungs, PerNothing(), c, s); !errors.As(err, &wrong) || wrong.Error() == "" {
			t.Errorf("%s to %s, %d rungs: got %v, want it refused", x.from, x.to, x.rungs, err)
		}
	}
	var kind *quantity.KindError
	if _, err := Ladder(dose(t, "5 mg/h"), dose(t, "6 units/h"), 8, PerNothing(), c, s); !errors.As(err, &kind) {
		t.Errorf("mass to units: got %v", err)
	}
	var missing *quantity.NotGivenError
	if _, err := Ladder(quantity.DoseRate{}, dose(t, "6 mg/h"), 8, PerNothing(), c, s); !errors.As(err, &missing) {
		t.Errorf("no lower end: got %v", err)
	}
	var below *BelowStep
	if _, err := Ladder(dose(t, "0.01 mg/h"), dose(t, "0.1 mg/h"), 10, PerNothing(), c, s); !errors.As(err, &below) {
		t.Errorf("rungs below the step: got %v", err)
	}
}

// TestLadderLaws holds every ladder to its promise, on ranges from a factor of
// two up, with ends of two digits.
func TestLadderLaws(t *testing.T) {
	c, s := conc(t, "1 mg/mL"), step(t, "0.01")
	rapid.Check(t, func(t *rapid.T) {
		a := rapid.Int64Range(1, 99).Draw(t, "from")
		b := rapid.Int64Range(2*a, 40*a+1).Draw(t, "to")
		rungs := rapid.IntRange(FewestRungs, MostRungs).Draw(t, "rungs")
		from, err1 := quantity.ParseDoseRate(strconv.FormatInt(a, 10) + " mg/h")
		to, err2 := quantity.ParseDoseRate(strconv.FormatInt(b, 10) + " mg/h")
		if err := errors.Join(err1, err2); err != nil {
			t.Fatal(err)
		}
		list, err := Ladder(from, to, rungs, PerNothing(), c, s)
		if err != nil {
			t.Fatalf("%d to %d: %v", a, b, err)
		}
		if len(list) < FewestRungs || len(list) > MostRungs {
			t.Fatalf("%d to %d: got %d rungs", a, b, len(list))
		}
		spacing := new(big.Rat).Sub(list[1].Dose.Rat(), list[0].Dose.Rat())
		for i, rung := range list {
			at := rung.Dose.Rat()
			if at.Cmp(from.Rat()) < 0 || at.Cmp(to.Rat()) > 0 || !new(big.Rat).Quo(at, spacing).IsInt() {
				t.Fatalf("%d to %d: rung %s is out of range or off the grid of %s", a, b, at.RatString(), spacing.RatString())
			}
			if i > 0 && new(big.Rat).Sub(at, list[i-1].Dose.Rat()).Cmp(spacing) != 0 {
				t.Fatalf("%d to %d: uneven at rung %s", a, b, at.RatString())
			}
		}
		if gap := new(big.Rat).Sub(list[0].Dose.Rat(), from.Rat()); gap.Cmp(spacing) >= 0 {
			t.Fatalf("%d to %d: a rung is missing at the foot", a, b)
		}
		if gap := new(big.Rat).Sub(to.Rat(), list[len(list)-1].Dose.Rat()); gap.Cmp(spacing) >= 0 {
			t.Fatalf("%d to %d: a rung is missing at the top", a, b)
		}
		if digits := strings.Trim(strings.Replace(spacing.FloatString(6), ".", "", 1), "0"); digits != "1" && digits != "2" && digits != "25" && digits != "5" {
			t.Fatalf("%d to %d: got a spacing of %s, want a round one", a, b, spacing.RatString())
		}
	})
}

// drawn is a dose rate of any kind and basis, with a Per and a concentration
// that go with it.
func drawn(t *rapid.T) (quantity.DoseRate, Per, quantity.Concentration) {
	unit := rapid.SampledFrom([][2]string{
		{"g", "mg"}, {"mg", "mg"}, {"mcg", "mg"}, {"ng", "mcg"}, {"units", "units"}, {"milliunits", "units"}, {"mmol", "mmol"}, {"micromol", "mmol"},
	}).Draw(t, "unit")
	basis := rapid.SampledFrom([]string{"", "/kg", "/m2"}).Draw(t, "basis")
	period := rapid.SampledFrom([]string{"min", "h", "day"}).Draw(t, "period")
	number := func(name string) string {
		return strconv.Itoa(rapid.IntRange(0, 9999).Draw(t, name)) + "." + strconv.Itoa(rapid.IntRange(1, 999).Draw(t, name+" decimals"))
	}
	d, err1 := quantity.ParseDoseRate(number("dose") + " " + unit[0] + basis + "/" + period)
	c, err2 := quantity.ParseConcentration(number("concentration") + " " + unit[1] + "/mL")
	w, err3 := quantity.ParseBodyWeight(number("weight") + " kg")
	a, err4 := quantity.ParseSurface(number("surface") + " m2")
	if err := errors.Join(err1, err2, err3, err4); err != nil {
		t.Fatal(err)
	}
	switch d.Basis() {
	case quantity.PerKilogram:
		return d, PerWeight(w), c
	case quantity.PerSquareMetre:
		return d, PerSurface(a), c
	case quantity.Absolute:
		return d, PerNothing(), c
	}
	t.Fatalf("no basis in %q", d.Written())
	return quantity.DoseRate{}, Per{}, quantity.Concentration{}
}

// TestThereAndBack: the flow of a dose rate gives that dose rate back, exactly.
func TestThereAndBack(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		d, per, c := drawn(t)
		f, err := Flow(d, per, c)
		if err != nil {
			t.Fatal(err)
		}
		back, err := Delivered(f, per, c, d)
		if err != nil {
			t.Fatal(err)
		}
		if n, err := back.Cmp(d); err != nil || n != 0 || back.Exact() != d.Exact() {
			t.Fatalf("%s: got %s back, %v", d.Written(), back.Exact(), err)
		}
	})
}

// TestUnitInvariance: one dose rate written in three ways needs one flow.
func TestUnitInvariance(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.Int64Range(1, 100000).Draw(t, "micrograms per minute")
		w := PerWeight(quantity.Kilograms(big.NewRat(rapid.Int64Range(5, 2000).Draw(t, "hectograms"), 10)))
		c, err := quantity.ParseConcentration("80 microgram/mL")
		if err != nil {
			t.Fatal(err)
		}
		var flows []string
		for _, s := range []string{
			strconv.FormatInt(n, 10) + " microgram/kg/min",
			strconv.FormatInt(n*60*1000, 10) + " nanogram/kg/h",
			big.NewRat(n*1440, 1000000).FloatString(6) + " g/kg/day",
		} {
			d, err := quantity.ParseDoseRate(s)
			if err != nil {
				t.Fatal(err)
			}
			f, err := Flow(d, w, c)
			if err != nil {
				t.Fatal(err)
			}
			flows = append(flows, f.Exact())
		}
		if flows[0] != flows[1] || flows[0] != flows[2] {
			t.Fatalf("got %v mL/h, want one flow", flows)
		}
	})
}

// TestRoundingLaws: a rounded rate is the nearest step with ties up; the other
// two directions never pass the exact flow.
func TestRoundingLaws(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		d, per, c := drawn(t)
		s := quantity.MillilitresPerHour(big.NewRat(1, rapid.SampledFrom([]int64{1, 10, 100}).Draw(t, "step")))
		up, err := SetNotBelow(d, per, c, s)
		if err != nil {
			t.Fatal(err)
		}
		if up.Rate.Cmp(up.Exact) < 0 {
			t.Fatalf("%s: rounded up to %s, below %s", d.Written(), up.Rate.Exact(), up.Exact.Exact())
		}
		down, err := SetNotAbove(d, per, c, s)
		var below *BelowStep
		if errors.As(err, &below) {
			return
		}
		if err != nil || down.Rate.Cmp(down.Exact) > 0 {
			t.Fatalf("%s: rounded down to %s, above %s, %v", d.Written(), down.Rate.Exact(), down.Exact.Exact(), err)
		}
		near, err := Set(d, per, c, s)
		if err != nil {
			t.Fatal(err)
		}
		off := new(big.Rat).Sub(near.Rate.Rat(), near.Exact.Rat())
		if twice := off.Mul(off, big.NewRat(2, 1)); twice.Cmp(s.Rat()) > 0 || twice.Cmp(new(big.Rat).Neg(s.Rat())) <= 0 {
			t.Fatalf("%s: got %s mL/h for %s", d.Written(), near.Rate.Exact(), near.Exact.Exact())
		}
	})
}
