package quantity

import (
	"errors"
	"math/big"
	"reflect"
	"testing"

	"pgregory.net/rapid"
)

func kindError(err error) bool  { var e *KindError; return errors.As(err, &e) }
func basisError(err error) bool { var e *BasisError; return errors.As(err, &e) }
func missing(err error) bool    { var e *NotGivenError; return errors.As(err, &e) }

func volume(t testing.TB, s string) Volume {
	t.Helper()
	return Millilitres(rat(t, s))
}

// TestToStep: ties are those of published rate grids, which print them half up:
// US prescribing information, cisatracurium, section 2.6 (40.5 as 41, 20.25 as
// 20.3), and a hospital's critical-care grid for adrenaline (2.25 as 2.3).
// The rest is by hand.
func TestToStep(t *testing.T) {
	for _, c := range []struct {
		x, step string
		d       Direction
		want    string
	}{
		{"40.5", "1", HalfUp, "41"}, {"20.25", "0.1", HalfUp, "20.3"}, {"2.25", "0.1", HalfUp, "2.3"},
		{"41.5", "1", HalfUp, "42"}, {"1.35", "0.1", HalfUp, "1.4"}, {"40.49", "1", HalfUp, "40"}, {"0.04", "0.1", HalfUp, "0"}, {"0.05", "0.1", HalfUp, "0.1"},
		{"40.5", "1", Up, "41"}, {"40.5", "1", Down, "40"}, {"41", "1", Up, "41"}, {"41", "1", Down, "41"}, {"41", "1", HalfUp, "41"},
		{"20.21", "0.1", Up, "20.3"}, {"20.29", "0.1", Down, "20.2"}, {"1/3", "0.01", HalfUp, "0.33"}, {"2/3", "0.01", HalfUp, "0.67"}, {"2/3", "0.01", Down, "0.66"}, {"1/3", "0.01", Up, "0.34"},
		{"7.3", "0.2", HalfUp, "7.4"}, {"7.3", "0.5", HalfUp, "7.5"}, {"7.25", "0.5", HalfUp, "7.5"}, {"0", "0.1", Up, "0"},
	} {
		v, lost, err := volume(t, c.x).ToStep(volume(t, c.step), c.d)
		if err != nil || v.Rat().Cmp(rat(t, c.want)) != 0 {
			t.Errorf("%s to %s, direction %d: got %s, %v, want %s", c.x, c.step, c.d, v.Exact(), err, c.want)
			continue
		}
		if c.x != "0" {
			want := mulRat(quoRat(new(big.Rat).Sub(rat(t, c.want), rat(t, c.x)), rat(t, c.x)), big.NewRat(100, 1))
			if lost.Cmp(want) != 0 {
				t.Errorf("%s to %s: lost %v %%, want %v", c.x, c.step, lost, want)
			}
		}
		f, _, err := MillilitresPerHour(rat(t, c.x)).ToStep(MillilitresPerHour(rat(t, c.step)), c.d)
		if err != nil || f.Rat().Cmp(v.Rat()) != 0 {
			t.Errorf("flow %s: got %s, %v, want %s", c.x, f.Exact(), err, v.Exact())
		}
	}
	w, err := Kilograms(rat(t, "32.65865064")).ToStep(big.NewRat(1, 10), HalfUp)
	s, errS := SquareMetres(rat(t, "1.725")).ToStep(big.NewRat(1, 100), HalfUp)
	p, errP := PerCent(rat(t, "-2.5")).ToStep(big.NewRat(1, 1), HalfUp)
	if err != nil || errS != nil || errP != nil || w.Exact() != "32.7" || s.Exact() != "1.73" || p.Exact() != "-2" {
		t.Errorf("got %s kg, %s m², %s %%", w.Exact(), s.Exact(), p.Exact())
	}
}

func TestToStepRefused(t *testing.T) {
	v := volume(t, "1")
	for name, err := range map[string]error{
		"no step": second(v.ToStep(Volume{}, HalfUp)), "zero step": second(v.ToStep(volume(t, "0"), HalfUp)), "no direction": second(v.ToStep(v, 0)),
		"strange direction": second(v.ToStep(v, 4)), "no volume": second(Volume{}.ToStep(v, HalfUp)),
	} {
		if !missing(err) {
			t.Errorf("%s: got %v, want a *NotGivenError", name, err)
		}
	}
	if _, err := Kilograms(big.NewRat(1, 1)).ToStep(nil, HalfUp); !missing(err) {
		t.Errorf("no step in kg: got %v", err)
	}
}

func second(_ Volume, _ *big.Rat, err error) error { return err }

// TestContainersAndMinutes: by hand; containers count up, time runs down.
func TestContainersAndMinutes(t *testing.T) {
	for _, c := range []struct {
		v, each string
		want    int
	}{{"0", "5", 0}, {"0.1", "5", 1}, {"5", "5", 1}, {"5.01", "5", 2}, {"15", "5", 3}, {"10", "10/3", 3}, {"50000", "5", 10000}} {
		if n, err := volume(t, c.v).Containers(volume(t, c.each)); err != nil || n != c.want {
			t.Errorf("%s mL of %s mL: got %d, %v, want %d", c.v, c.each, n, err, c.want)
		}
	}
	if n, err := volume(t, "50001").Containers(volume(t, "5")); faultIn(t, "50001", err).Code != TooManyDigit || n != 0 {
		t.Errorf("got %d, %v, want a refusal", n, err)
	}
	if _, err := volume(t, "1").Containers(Volume{}); !missing(err) {
		t.Errorf("no container: got %v", err)
	}
	for _, c := range []struct {
		v, f string
		want int64
	}{{"50", "7", 428}, {"50", "10", 300}, {"1", "61", 0}, {"50", "2.1", 1428}} { // 428.57, 300, 0.98, 1428.57
		if n, err := volume(t, c.v).Minutes(MillilitresPerHour(rat(t, c.f))); err != nil || n != c.want {
			t.Errorf("%s mL at %s mL/h: got %d min, %v, want %d", c.v, c.f, n, err, c.want)
		}
	}
	if _, err := volume(t, "1").Minutes(MillilitresPerHour(new(big.Rat))); !missing(err) {
		t.Errorf("a flow of nothing: got %v", err)
	}
}

// TestKindsNeverMix: mass, activity and amount of substance meet nowhere
// (ISO 11240: units of activity convert into nothing).
func TestKindsNeverMix(t *testing.T) {
	one := big.NewRat(1, 1)
	units := map[Kind]Unit{ByMass: Milligram(), ByActivity: Units(), BySubstance: Millimole()}
	for ka, ua := range units {
		for kb, ub := range units {
			a, b := AmountOf(one, ua), AmountOf(one, ub)
			ca, _ := a.In(Millilitres(one))
			cb, _ := b.In(Millilitres(one))
			_, plus := a.Plus(b)
			_, minus := a.Minus(b)
			_, share := a.Share(b)
			_, cmp := a.Cmp(b)
			_, drawn := a.DrawnAt(cb)
			_, cmpC := ca.Cmp(cb)
			_, dose := doseOf(one, ua, Absolute).Cmp(doseOf(one, ub, Absolute))
			_, rate := doseRateOf(one, ua, Absolute, PerHour).Cmp(doseRateOf(one, ub, Absolute, PerHour))
			_, flow := doseRateOf(one, ua, Absolute, PerHour).At(cb)
			_, gives := MillilitresPerHour(one).Giving(ca, ub, PerHour)
			for name, err := range map[string]error{"plus": plus, "minus": minus, "share": share, "cmp": cmp, "drawn": drawn, "concentrations": cmpC, "doses": dose, "dose rates": rate, "flow": flow, "giving": gives} {
				if (ka != kb) != kindError(err) || (ka == kb) != (err == nil) {
					t.Errorf("%s of %v and %v: got %v", name, ka, kb, err)
				}
			}
			if same := ka == kb; a.Equal(b) != same || ca.Equal(cb) != same || (a.Exact(ub) != "") != same || (ca.Exact(ub) != "") != same || (UK().AmountIn(a, ub) != "") != same || (UK().ConcentrationIn(ca, ub) != "") != same {
				t.Errorf("%v in %v: %q, %q", ka, kb, a.Exact(ub), UK().AmountIn(a, ub))
			}
		}
	}
}

// TestBasis: a dose per kg needs a weight, one per m² a surface, and neither is
// used as the other or as absolute.
func TestBasis(t *testing.T) {
	one := big.NewRat(1, 1)
	w, s := Kilograms(big.NewRat(70, 1)), SquareMetres(big.NewRat(9, 5))
	c, _ := AmountOf(one, Milligram()).In(Millilitres(one))
	for _, b := range []Basis{Absolute, PerKilogram, PerSquareMetre} {
		d, r := doseOf(one, Milligram(), b), doseRateOf(one, Milligram(), b, PerHour)
		_, dFor := d.For(w)
		_, dOn := d.On(s)
		_, dAbs := d.Amount()
		_, rFor := r.For(w)
		_, rOn := r.On(s)
		_, rAt := r.At(c)
		_, perW := r.PerWeight(w)
		_, perS := r.PerSurface(s)
		_, cmp := d.Cmp(doseOf(one, Milligram(), Absolute))
		_, cmpR := r.Cmp(doseRateOf(one, Milligram(), Absolute, PerHour))
		for name, got := range map[string]struct {
			err error
			ok  bool
		}{
			"dose for": {dFor, b == PerKilogram}, "dose on": {dOn, b == PerSquareMetre}, "dose amount": {dAbs, b == Absolute}, "doses": {cmp, b == Absolute},
			"rate for": {rFor, b == PerKilogram}, "rate on": {rOn, b == PerSquareMetre}, "flow": {rAt, b == Absolute}, "rates": {cmpR, b == Absolute},
			"per weight": {perW, b == Absolute}, "per surface": {perS, b == Absolute},
		} {
			if (got.err == nil) != got.ok || basisError(got.err) == got.ok {
				t.Errorf("%s, %v: got %v", name, b, got.err)
			}
		}
	}
}

// TestNotGiven: the zero value is nothing, is refused where it is needed, and
// stops nothing.
func TestNotGiven(t *testing.T) {
	one := big.NewRat(1, 1)
	a, v, f := AmountOf(one, Milligram()), Millilitres(one), MillilitresPerHour(one)
	c, _ := a.In(v)
	r := doseRateOf(one, Milligram(), Absolute, PerHour)
	for name, err := range map[string]error{
		"in": errOf(a.In(Volume{})), "in nothing": errOf(Amount{}.In(v)), "drawn": errOf(a.DrawnAt(Concentration{})), "holds": errOf(Volume{}.Holds(c)), "minus": errOf(v.Minus(Volume{})),
		"minutes": errOf(Volume{}.Minutes(f)), "weight": errOf(doseOf(one, Gram(), PerKilogram).For(BodyWeight{})), "surface": errOf(doseOf(one, Gram(), PerSquareMetre).On(BodySurfaceArea{})),
		"rate weight": errOf(doseRateOf(one, Gram(), PerKilogram, PerHour).For(BodyWeight{})), "rate surface": errOf(doseRateOf(one, Gram(), PerSquareMetre, PerHour).On(BodySurfaceArea{})),
		"per weight": errOf(r.PerWeight(BodyWeight{})), "per zero weight": errOf(r.PerWeight(Kilograms(new(big.Rat)))), "per surface": errOf(r.PerSurface(BodySurfaceArea{})),
		"giving": errOf(FlowRate{}.Giving(c, Milligram(), PerHour)), "giving per nothing": errOf(f.Giving(c, Milligram(), 0)), "share": errOf(a.Share(AmountOf(new(big.Rat), Gram()))),
	} {
		if !missing(err) {
			t.Errorf("%s: got %v, want a *NotGivenError", name, err)
		}
	}
	for name, err := range map[string]error{"plus": errOf(a.Plus(Amount{})), "cmp": errOf(Amount{}.Cmp(Amount{})), "at": errOf(r.At(Concentration{})), "giving in no unit": errOf(f.Giving(c, Unit{}, PerHour))} {
		if !kindError(err) {
			t.Errorf("%s: got %v, want a *KindError", name, err)
		}
	}
	minus := big.NewRat(-1, 1)
	if AmountOf(nil, Gram()).Given() || AmountOf(minus, Gram()).Given() || AmountOf(one, Unit{}).Given() || Millilitres(nil).Given() || Millilitres(minus).Given() || MillilitresPerHour(minus).Given() ||
		Kilograms(minus).Given() || SquareMetres(minus).Given() || Centimetres(minus).Given() || PerCent(nil).Given() || (Volume{}).Plus(v).Given() || v.Times(-1).Given() || a.Times(-1).Given() || (Amount{}).Times(2).Given() ||
		a.Scaled(nil, Gram()).Given() || (Amount{}).Scaled(one, Gram()).Given() || c.Scaled(new(big.Rat)).Given() || r.Scaled(minus).Given() || f.Scaled(nil).Given() || (Dose{}).Scaled(one).Given() {
		t.Error("a value that cannot be is given")
	}
	if whole(1).quo(whole(0)).given() {
		t.Error("something divided by nothing is given")
	}
	if k := (Amount{}).Scaled(one, Gram()).Kind(); k != 0 {
		t.Errorf("a value that is not given is counted by %v", k)
	}
	for _, text := range []string{UK().Amount(Amount{}), UK().Volume(Volume{}), UK().Concentration(Concentration{}), UK().Dose(Dose{}), UK().DoseRate(DoseRate{}), UK().FlowRate(FlowRate{}), UK().BodyWeight(BodyWeight{}),
		UK().Surface(BodySurfaceArea{}), UK().Length(Length{}), UK().Percent(Percent{}), UK().Number(nil), Concentration{}.InCode(), Amount{}.Exact(Gram()), Dose{}.Exact(), DoseRate{}.Exact(), Volume{}.Exact()} {
		if text != "" {
			t.Errorf("nothing prints %q", text)
		}
	}
	if (Amount{}).Rat() != nil || (Amount{}).IsZero() || (Volume{}).IsZero() || !AmountOf(new(big.Rat), Gram()).IsZero() {
		t.Error("nothing and zero are the same")
	}
}

func errOf[T any](_ T, err error) error { return err }

// TestNoDoubleEquals: a type that cannot be compared does not compile with ==.
func TestNoDoubleEquals(t *testing.T) {
	for _, v := range []any{Amount{}, Volume{}, Concentration{}, Dose{}, DoseRate{}, FlowRate{}, BodyWeight{}, BodySurfaceArea{}, Length{}, Percent{}, Unit{}} {
		if reflect.TypeOf(v).Comparable() {
			t.Errorf("%T compiles with ==", v)
		}
	}
}

// TestMinus: never below zero.
func TestMinus(t *testing.T) {
	one, two := big.NewRat(1, 1), big.NewRat(2, 1)
	if _, err := AmountOf(one, Gram()).Minus(AmountOf(two, Gram())); faultIn(t, "amount", err).Code != ZeroOrLess {
		t.Errorf("got %v", err)
	}
	if _, err := Millilitres(one).Minus(Millilitres(two)); faultIn(t, "volume", err).Code != ZeroOrLess {
		t.Errorf("got %v", err)
	}
	if d, err := AmountOf(one, Gram()).Minus(AmountOf(one, Gram())); err != nil || !d.IsZero() {
		t.Errorf("got %v, %v, want nothing left", d.Rat(), err)
	}
	if _, err := AmountOf(new(big.Rat), Gram()).In(Millilitres(one)); faultIn(t, "zero", err).Code != ZeroOrLess {
		t.Errorf("nothing in a volume: got %v", err)
	}
}

// TestSumsAgainstPlainFractions works every sum beside math/big.
func TestSumsAgainstPlainFractions(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		x, y, w, s := aRat().Draw(t, "x"), aRat().Draw(t, "y"), aRat().Draw(t, "w"), aRat().Draw(t, "s")
		u := aUnit().Draw(t, "unit")
		scale := AmountOf(big.NewRat(1, 1), u).Rat()
		a, v := AmountOf(x, u), Millilitres(y)
		same := func(name string, got, want *big.Rat) {
			if got == nil || got.Cmp(want) != 0 {
				t.Fatalf("%s: got %v, want %v", name, got, want)
			}
		}
		c, err := a.In(v)
		drawn, err2 := AmountOf(w, u).DrawnAt(c)
		held, err3 := Millilitres(s).Holds(c)
		if err != nil || err2 != nil || err3 != nil {
			t.Fatalf("%v, %v, %v", err, err2, err3)
		}
		mgPerMillilitre := quoRat(mulRat(x, scale), y)
		same("in", c.Rat(), mgPerMillilitre)
		same("drawn", drawn.Rat(), quoRat(mulRat(w, scale), mgPerMillilitre))
		same("holds", held.Rat(), mulRat(s, mgPerMillilitre))
		sum, _ := a.Plus(AmountOf(y, u))
		same("plus", sum.Rat(), mulRat(addRat(x, y), scale))
		same("volumes", v.Plus(Millilitres(s)).Rat(), addRat(y, s))
		same("times", a.Times(7).Rat(), mulRat(mulRat(x, scale), big.NewRat(7, 1)))
		share, _ := a.Share(AmountOf(y, u))
		same("share", share, quoRat(x, y))
		left, _ := sum.Minus(a)
		same("minus", left.Rat(), mulRat(y, scale))
		for _, p := range []struct {
			Period
			perHour *big.Rat
		}{{PerMinute, big.NewRat(60, 1)}, {PerHour, big.NewRat(1, 1)}, {PerDay, big.NewRat(1, 24)}} {
			// flow = dose x weight x time factor x amount factor / concentration
			perKg := doseRateOf(x, u, PerKilogram, p.Period)
			rate, _ := perKg.For(Kilograms(w))
			flow, _ := rate.At(c)
			same("flow", flow.Rat(), quoRat(mulRat(mulRat(mulRat(x, scale), w), p.perHour), mgPerMillilitre))
			given, _ := flow.Giving(c, u, p.Period)
			perKgAgain, _ := given.PerWeight(Kilograms(w))
			if n, err := perKgAgain.Cmp(perKg); err != nil || n != 0 || perKgAgain.Exact() != perKg.Exact() {
				t.Fatalf("there and back: got %s, want %s, %v", perKgAgain.Exact(), perKg.Exact(), err)
			}
			onSurface, _ := doseRateOf(x, u, PerSquareMetre, p.Period).On(SquareMetres(s))
			same("surface", onSurface.Rat(), mulRat(mulRat(mulRat(x, scale), s), p.perHour))
		}
		dose, _ := doseOf(x, u, PerKilogram).For(Kilograms(w))
		same("dose", dose.Rat(), mulRat(mulRat(x, scale), w))
		same("scaled", c.Scaled(w).Rat(), mulRat(mgPerMillilitre, w))
	})
}

// TestStepProperty: the moved value is on a step, and on the side asked for.
func TestStepProperty(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		x, step := aRat().Draw(t, "x"), aRat().Draw(t, "step")
		v, s := Millilitres(x), Millilitres(step)
		down, _, _ := v.ToStep(s, Down)
		up, _, _ := v.ToStep(s, Up)
		near, _, _ := v.ToStep(s, HalfUp)
		for _, moved := range []Volume{down, up, near} {
			if !quoRat(moved.Rat(), step).IsInt() {
				t.Fatalf("%v to %v: got %v", x, step, moved.Rat())
			}
		}
		below, above := new(big.Rat).Sub(x, down.Rat()), new(big.Rat).Sub(up.Rat(), x)
		if below.Sign() < 0 || above.Sign() < 0 || below.Cmp(step) >= 0 || above.Cmp(step) >= 0 {
			t.Fatalf("%v to %v: got %v and %v", x, step, down.Rat(), up.Rat())
		}
		want := up
		if below.Cmp(above) < 0 {
			want = down
		}
		if near.Cmp(want) != 0 {
			t.Fatalf("%v to %v: got %v, want %v", x, step, near.Rat(), want.Rat())
		}
	})
}

// TestUnitsDoNotMatter: the same amount written in two units is the same value
// and the same print, alone and per volume.
func TestUnitsDoNotMatter(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		a := anAmount().Draw(t, "a")
		u := aUnit().Filter(func(u Unit) bool { return u.Kind() == a.Kind() }).Draw(t, "other unit")
		b := AmountOf(fromText(t, a.Exact(u)), u)
		s := rapid.SampledFrom(styles()).Draw(t, "style")
		v := Millilitres(aRat().Draw(t, "v"))
		ca, errA := a.In(v)
		cb, errB := b.In(v)
		if errA != nil || errB != nil || !a.Equal(b) || !ca.Equal(cb) {
			t.Fatalf("%v and %v differ", a.Rat(), b.Rat())
		}
		if s.Amount(a) != s.Amount(b) || s.Concentration(ca) != s.Concentration(cb) || ca.InCode() != cb.InCode() {
			t.Fatalf("got %q and %q, %q and %q", s.Amount(a), s.Amount(b), s.Concentration(ca), s.Concentration(cb))
		}
	})
}

func fromText(t *rapid.T, s string) *big.Rat {
	r, ok := new(big.Rat).SetString(s)
	if !ok {
		t.Fatalf("%q is no fraction", s)
	}
	return r
}
