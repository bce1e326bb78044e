package certainty

import (
	"math/big"
	"testing"

	"drawup/dilution/quantity"
	"drawup/dilution/syringe"

	"pgregory.net/rapid"
)

// drawReading draws a reading that a stocked barrel shows, at least 0.1 mL.
func drawReading(t *rapid.T, label string, atLeast quantity.Volume) Measured {
	var fitting []syringe.Barrel
	for _, b := range syringe.Stocked() {
		if b.Nominal().Cmp(atLeast) >= 0 {
			fitting = append(fitting, b)
		}
	}
	b := rapid.SampledFrom(fitting).Draw(t, label+" barrel")
	first, _, err := atLeast.ToStep(b.Step(), quantity.Up)
	if err != nil {
		t.Fatal(err)
	}
	n := func(v quantity.Volume) int { return int(new(big.Rat).Quo(v.Rat(), b.Step().Rat()).Num().Int64()) }
	v := b.Step().Times(rapid.IntRange(n(first), n(b.Nominal())).Draw(t, label+" lines"))
	return Measured{Volume: v, Barrel: b}
}

// measurable draws again until the tolerance leaves something of the volume.
func measurable(t *rapid.T, label string, atLeast quantity.Volume) Measured {
	m := drawReading(t, label, atLeast)
	if m.Barrel.Tolerance(m.Volume).Cmp(m.Volume) >= 0 {
		t.Skip("a reading that measures nothing")
	}
	return m
}

func relative(m Measured) quantity.Percent {
	x := new(big.Rat).Quo(m.Barrel.Tolerance(m.Volume).Rat(), m.Volume.Rat())
	return perCent(x)
}

// TestPrintedIsTodays holds Printed to the figure that paper prints today: the
// rule of syringe.Interval over assay and readings, as the planner calls it.
func TestPrintedIsTodays(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		assay := quantity.PerCent(big.NewRat(rapid.Int64Range(0, 200).Draw(t, "assay"), 10))
		p := Preparation{Strength: conc(t, "10 mg/mL"), Assay: Around(assay)}
		parts := []quantity.Percent{assay}
		if rapid.Bool().Draw(t, "diluted") {
			drug := measurable(t, "drug", mL(t, "0.1"))
			final := measurable(t, "final", drug.Volume)
			p.Steps = []Step{MakeUpTo(final, drug)}
			parts = append(parts, relative(drug), relative(final))
		}
		want, err := syringe.Interval(parts...)
		if err != nil {
			t.Fatal(err)
		}
		r := of(t, p)
		if r.Printed.Rat().Cmp(want.Rat()) != 0 {
			t.Fatalf("got %s %%, paper prints %s %%", r.Printed.Exact(), want.Exact())
		}
		combined(t, r, parts)
	})
}

// combined holds U to the quick sums' own rule, which rounds its root half up at
// 40 digits: never below it, and less than two units of the tenth decimal above.
func combined(t *rapid.T, r Result, parts []quantity.Percent) {
	var widths []syringe.Width
	for _, p := range parts {
		widths = append(widths, syringe.Width{Percent: p, Shape: syringe.Rectangular})
	}
	u, err := syringe.Combine(widths...)
	if err != nil {
		t.Fatal(err)
	}
	above := new(big.Rat).Sub(r.Expanded.Rat(), u.Expanded.Rat())
	hair := new(big.Rat).SetFrac64(1, 1_000_000_000_000_000) // half up may stand that far above the root itself
	if above.Cmp(new(big.Rat).Neg(hair)) < 0 || above.Cmp(big.NewRat(2, 10_000_000_000)) >= 0 {
		t.Fatalf("got U %s %%, the quick sums %s %%", r.Expanded.Exact(), u.Expanded.Exact())
	}
}

// TestPrintedElsewhere holds what the package comment says of the other kinds:
// narrower than paper in a bag, wider for a powder, equal to paper when one
// syringe withdraws and adds.
func TestPrintedElsewhere(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		assay := quantity.PerCent(big.NewRat(rapid.Int64Range(0, 200).Draw(t, "assay"), 10))
		drug := measurable(t, "drug", mL(t, "0.1"))
		bag := Fill{Stated: quantity.Millilitres(big.NewRat(rapid.Int64Range(100, 1000).Draw(t, "bag"), 1))}
		today, err := syringe.Interval(assay, relative(drug))
		if err != nil {
			t.Fatal(err)
		}
		printed := func(powder *Powder, steps ...Step) *big.Rat {
			return of(t, Preparation{Strength: conc(t, "10 mg/mL"), Assay: Around(assay), Powder: powder, Steps: steps}).Printed.Rat()
		}
		if got := printed(nil, AddToBag(bag, drug)); got.Cmp(today.Rat()) > 0 {
			t.Fatalf("bag: got %s %%, more than paper's %s %%", got, today.Exact())
		}
		if got := printed(nil, WithdrawThenAdd(bag, []Measured{drug}, drug)); got.Cmp(today.Rat()) > 0 {
			t.Fatalf("two syringes for one bag: got %s %%, more than paper's %s %%", got, today.Exact())
		}
		one := drug
		one.Syringe = "the only one"
		if got := printed(nil, WithdrawThenAdd(bag, []Measured{one}, one)); got.Cmp(today.Rat()) != 0 {
			t.Fatalf("one syringe for one bag: got %s %%, want paper's %s %%", got, today.Exact())
		}
		powder := &Powder{Added: measurable(t, "fluid", mL(t, "1")), Displaced: Fill{Stated: mL(t, "0.2")}}
		if neat, err := syringe.Interval(assay); err != nil || printed(powder).Cmp(neat.Rat()) < 0 {
			t.Fatalf("powder: less than paper's %s %%", neat.Exact())
		}
	})
}

// TestEnds holds the two intervals to each other: the worst case encloses the
// one after GUM, which encloses the best figure; where nothing is uneven, best
// and stated are one.
func TestEnds(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		low := rapid.Int64Range(80, 100).Draw(t, "assay low")
		high := rapid.Int64Range(100, 120).Draw(t, "assay high")
		first := measurable(t, "drug", mL(t, "0.1"))
		made := measurable(t, "made", first.Volume)
		second := measurable(t, "second", mL(t, "0.1"))
		if second.Volume.Cmp(made.Volume) > 0 {
			t.Skip("more than there is")
		}
		diluent := measurable(t, "diluent", mL(t, "0.1"))
		r := of(t, Preparation{Strength: conc(t, "10 mg/mL"),
			Assay: Limits{quantity.PerCent(big.NewRat(low, 1)), quantity.PerCent(big.NewRat(high, 1))},
			Steps: []Step{MakeUpTo(made, first), AddDiluent([]Measured{diluent}, second)}})
		ordered := []quantity.Concentration{r.Worst.Low, r.GUM.Low, r.Best, r.GUM.High, r.Worst.High}
		for i := 1; i < len(ordered); i++ {
			if ordered[i-1].Rat().Cmp(ordered[i].Rat()) > 0 {
				t.Fatalf("ends out of order: %v", ordered)
			}
		}
		if (low+high == 200) != r.Best.Equal(r.Stated) {
			t.Fatalf("assay %d to %d %%: best %s, stated %s", low, high, r.Best.Rat(), r.Stated.Rat())
		}
		shares := new(big.Rat)
		for _, c := range r.Contributions {
			shares.Add(shares, c.Share.Rat())
			if c.HalfWidth.Rat().Cmp(r.Largest.HalfWidth.Rat()) > 0 {
				t.Fatalf("%s is wider than the largest, %s", c, r.Largest)
			}
		}
		if shares.Cmp(big.NewRat(100, 1)) != 0 {
			t.Fatalf("shares add up to %s %%", shares)
		}
	})
}
