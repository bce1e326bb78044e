package twostep

import (
	"errors"
	"math/big"
	"testing"

	"drawup/dilution/certainty"
	"drawup/dilution/quantity"
	"drawup/dilution/syringe"

	"pgregory.net/rapid"
)

// TestLaws holds every plan to what a person at the bench relies on: volumes on
// graduations, nothing below the smallest, mass balance exact, bounds of the
// intermediate kept, the concentration within the tolerance and recomputed from
// the four readings alone.
func TestLaws(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		w := wanted(t, "10 mg/mL", "1 mg/mL", rapid.SampledFrom([]string{"1", "2", "5", "10", "20", "50"}).Draw(t, "final"))
		w.Concentration = w.Strength.Scaled(big.NewRat(rapid.Int64Range(1, 99).Draw(t, "part"), rapid.Int64Range(100, 9000).Draw(t, "of")))
		w.High = conc(t, "5 mg/mL")
		f, err := Find(w)
		var none *NoneError
		if errors.As(err, &none) {
			t.Skip("nothing comes near")
		} else if err != nil {
			t.Fatal(err)
		}
		v := make([]*big.Rat, 4)
		for i, r := range []syringe.Reading{f.Draw, f.Intermediate.Reading, f.Take, f.Final.Reading} {
			v[i] = r.Volume.Rat()
			if !new(big.Rat).Quo(v[i], r.Barrel.Step().Rat()).IsInt() || r.Volume.Cmp(r.Barrel.Nominal()) > 0 || r.Volume.Cmp(w.Smallest) < 0 || r.MovedPercent.Sign() != 0 {
				t.Fatalf("%s mL on the %s mL barrel", r.Volume.Exact(), r.Barrel.Nominal().Exact())
			}
		}
		want := new(big.Rat).Quo(v[0], v[1])
		if f.Intermediate.Concentration.Rat().Cmp(new(big.Rat).Mul(want, big.NewRat(10, 1))) != 0 || want.Cmp(big.NewRat(1, 2)) > 0 {
			t.Fatalf("intermediate of %s mg/mL", f.Intermediate.Concentration.Rat())
		}
		want.Mul(want, v[2]).Quo(want, v[3]).Mul(want, big.NewRat(10, 1))
		if f.Final.Concentration.Rat().Cmp(want) != 0 {
			t.Fatalf("got %s mg/mL, the readings give %s", f.Final.Concentration.Rat(), want)
		}
		off := want.Quo(want, w.Concentration.Rat())
		off.Sub(off, big.NewRat(1, 1)).Mul(off, big.NewRat(100, 1))
		if f.Error.Rat().Cmp(off) != 0 || off.Abs(off).Cmp(w.Tolerance.Rat()) > 0 {
			t.Fatalf("got %s %% off, the readings give %s", f.Error.Rat(), off)
		}
		balanced(t, w.Strength, f.Plan)
	})
}

// balanced holds what was drawn to what is in the giving syringe and what is
// left, and every diluent to what it fills (rule R6).
func balanced(t failing, strength quantity.Concentration, p Plan) {
	t.Helper()
	drawn := new(big.Rat).Mul(p.Draw.Volume.Rat(), strength.Rat())
	kept := new(big.Rat).Add(p.Final.Amount.Rat(), p.LeftAmount.Rat())
	if drawn.Cmp(kept) != 0 || drawn.Cmp(p.Intermediate.Amount.Rat()) != 0 {
		t.Fatal("drawn ", drawn, ", in the giving syringe and left ", kept)
	}
	for _, pair := range [][3]quantity.Volume{
		{p.Draw.Volume, p.Intermediate.Diluent, p.Intermediate.Reading.Volume},
		{p.Take.Volume, p.Final.Diluent, p.Final.Reading.Volume},
		{p.Take.Volume, p.LeftVolume, p.Intermediate.Reading.Volume},
	} {
		if pair[0].Plus(pair[1]).Cmp(pair[2]) != 0 {
			t.Fatal(pair[0].Exact(), " mL and ", pair[1].Exact(), " mL do not make ", pair[2].Exact(), " mL")
		}
	}
}

// TestSameOrder finds the same readings for one order in other units, written as
// an amount, and with all drug doubled.
func TestSameOrder(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		w := wanted(t, "10 mg/mL", "1 mg/mL", "20")
		share := big.NewRat(rapid.Int64Range(1, 99).Draw(t, "part"), rapid.Int64Range(500, 9000).Draw(t, "of"))
		w.Concentration = w.Strength.Scaled(share)
		first, err := Find(w)
		if err != nil {
			t.Skip(err)
		}
		micro := w
		micro.Strength = conc(t, "10000 microgram/mL")
		micro.Concentration = micro.Strength.Scaled(share)
		amount := w
		amount.Concentration = quantity.Concentration{}
		if amount.Amount, err = w.Volume.Holds(w.Concentration); err != nil {
			t.Fatal(err)
		}
		double := w
		double.Strength, double.Concentration = w.Strength.Scaled(big.NewRat(2, 1)), w.Concentration.Scaled(big.NewRat(2, 1))
		for name, other := range map[string]Wanted{"microgram": micro, "amount": amount, "double": double} {
			f, err := Find(other)
			if err != nil {
				t.Fatal(err)
			}
			for i, pair := range [][2]syringe.Reading{{first.Draw, f.Draw}, {first.Intermediate.Reading, f.Intermediate.Reading}, {first.Take, f.Take}, {first.Final.Reading, f.Final.Reading}} {
				if pair[0].Volume.Cmp(pair[1].Volume) != 0 || pair[0].Barrel.Nominal().Cmp(pair[1].Barrel.Nominal()) != 0 {
					t.Fatalf("%s: reading %d is %s mL, was %s mL", name, i, pair[1].Volume.Exact(), pair[0].Volume.Exact())
				}
			}
			if f.Weighed != first.Weighed || len(f.Rivals) != len(first.Rivals) {
				t.Fatalf("%s: another search", name)
			}
		}
	})
}

// TestSpreadIsCertaintys holds the spread of a plan, and of the plan of one step
// beside it, to the worst case of package certainty with an exact assay.
func TestSpreadIsCertaintys(t *testing.T) {
	measured := func(r syringe.Reading) certainty.Measured {
		return certainty.Measured{Volume: r.Volume, Barrel: r.Barrel}
	}
	for _, target := range []string{"0.1 units/mL", "0.37 units/mL", "2 units/mL", "7.3 units/mL"} {
		w := wanted(t, "100 units/mL", target, "50")
		f, err := Find(w)
		if err != nil {
			t.Fatal(err)
		}
		p := certainty.Preparation{Strength: w.Strength, Assay: certainty.Around(per(t, "0")), Steps: []certainty.Step{
			certainty.MakeUpTo(measured(f.Intermediate.Reading), measured(f.Draw)),
			certainty.MakeUpTo(measured(f.Final.Reading), measured(f.Take)),
		}}
		two, err := certainty.Of(p)
		if err != nil {
			t.Fatal(err)
		}
		if two.Worst.Spread().Cmp(f.Spread) != 0 || !two.Stated.Equal(f.Final.Concentration) {
			t.Errorf("%s: spread %s, package certainty has %s", target, f.Spread.FloatString(6), two.Worst.Spread().FloatString(6))
		}
		if f.OneStep == nil {
			continue
		}
		p.Steps = []certainty.Step{certainty.MakeUpTo(measured(f.OneStep.Final.Reading), measured(f.OneStep.Draw))}
		one, err := certainty.Of(p)
		if err != nil {
			t.Fatal(err)
		}
		if one.Worst.Spread().Cmp(f.OneStep.Spread) != 0 || !one.Stated.Equal(f.OneStep.Final.Concentration) {
			t.Errorf("%s in one step: spread %s, package certainty has %s", target, f.OneStep.Spread.FloatString(6), one.Worst.Spread().FloatString(6))
		}
		against, err := certainty.Compare(one, two)
		if err != nil || against.Worst != f.OneStep.Spread.Cmp(f.Spread) {
			t.Errorf("%s: one step against two is %v, %v", target, against, err)
		}
	}
}

// TestOneStepBeside gives the plan of one step where there is one, and otherwise
// the reason: 0.05 mL of 100 units/mL is below 0.1 mL, 2.5 mL is not. Worked by
// hand.
func TestOneStepBeside(t *testing.T) {
	f, err := Find(wanted(t, "100 units/mL", "0.1 units/mL", "50"))
	var below *syringe.BelowSmallest
	if err != nil || f.OneStep != nil || !errors.As(f.OneStepError, &below) || below.Got.Exact() != "0.05" {
		t.Errorf("got %v, %v, want 0.05 mL below the smallest", f.OneStepError, err)
	}
	f, err = Find(wanted(t, "100 units/mL", "5 units/mL", "50"))
	if err != nil || f.OneStepError != nil || f.OneStep.Draw.Volume.Exact() != "2.6" || f.OneStep.Error.Exact() != "4" {
		t.Fatalf("got %+v, %v, %v, want 2.6 mL for 2.5 mL, 4 %% more", f.OneStep, f.OneStepError, err)
	}
	if off := f.Error.Rat(); off.Sign() != 0 {
		t.Errorf("two steps are %s %% off, want none", off)
	}
}

// TestRivals names why each loses: 0.37 micrograms/mL of 50 micrograms/mL in 20
// mL, 0.148 mL of the strength, which the stocked barrels hit without error.
// That they are the narrowest and the most thrifty is for TestNeverWorse.
func TestRivals(t *testing.T) {
	f, err := Find(wanted(t, "50 microgram/mL", "0.37 microgram/mL", "20"))
	if err != nil {
		t.Fatal(err)
	}
	if f.Error.Rat().Sign() != 0 || len(f.Rivals) != 3 {
		t.Fatalf("got %s %% off, %d rivals, want none off and three", f.Error.Rat(), len(f.Rivals))
	}
	narrow, thrifty, next := f.Rivals[0], f.Rivals[1], f.Rivals[2]
	if !narrow.Narrowest || narrow.Lost != FartherOff || narrow.Spread.Cmp(f.Spread) >= 0 || narrow.Error.Rat().Sign() == 0 {
		t.Errorf("narrowest: %s, lost as %s", judged(narrow.Plan), narrow.Lost)
	}
	if !thrifty.LeastWaste || thrifty.Lost != FartherOff || thrifty.LeftAmount.Rat().Cmp(f.LeftAmount.Rat()) >= 0 || thrifty.Error.Rat().Sign() == 0 {
		t.Errorf("least waste: %s, lost as %s", judged(thrifty.Plan), thrifty.Lost)
	}
	if next.Narrowest || next.LeastWaste || next.Lost == FartherOff || next.Error.Rat().Sign() != 0 {
		t.Errorf("next: %s, lost as %s", judged(next.Plan), next.Lost)
	}
	for r := FartherOff; r <= TieRule; r++ {
		if r.String() == "" {
			t.Errorf("reason %d has no words", r)
		}
	}
}

// TestBounded says when the search stops at its bound, and still finds a plan.
func TestBounded(t *testing.T) {
	w := wanted(t, "10 mg/mL", "0.013 mg/mL", "20")
	w.Barrels = append(w.Barrels, barrelOf(t, "10", "0.02"))
	f, err := Find(w)
	if err != nil || !f.Bounded || f.Weighed != bound {
		t.Errorf("got %d weighed, bounded %v, %v, want the bound", f.Weighed, f.Bounded, err)
	}
	for _, target := range []string{"0.1 mg/mL", "0.013 mg/mL", "5 mg/mL", "0.0021 mg/mL"} {
		w := wanted(t, "10 mg/mL", target, "50")
		if f, err := Find(w); err != nil || f.Bounded {
			t.Errorf("%s with the stocked barrels: bounded %v, %v", target, f.Bounded, err)
		}
	}
}
