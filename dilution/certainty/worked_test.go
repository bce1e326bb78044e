package certainty

import (
	"math/big"
	"testing"

	"drawup/dilution/quantity"
)

// TestWorkedValues holds the worked values of the project's own reference on
// calculation, part g (derived there by hand after GUM, ISO/IEC Guide 98-3, with
// rectangular limits): 1 mL in a 2 mL syringe (5 %) to 10 mL in a 10 mL syringe
// (4 %) from an ampoule of 5 %: u 4.69 %, U 9.4 %, worst case +14.8 and -13.2 %;
// with the diluent measured and added instead 4.40 %; with a second step of 1 in
// 10 5.97 %.
func TestWorkedValues(t *testing.T) {
	five := Around(per(t, "5"))
	drug, final := in(t, "1", "2"), in(t, "10", "10")
	for _, c := range []struct {
		name              string
		steps             []Step
		u, expanded       string
		worstLow, worstUp string // "" where nothing is published
	}{
		{"made up", []Step{MakeUpTo(final, drug)}, "4.69", "9.4", "-13.2", "14.8"},
		{"diluent added", []Step{AddDiluent([]Measured{in(t, "9", "10")}, drug)}, "4.40", "", "", ""},
		{"two steps", []Step{MakeUpTo(final, drug), MakeUpTo(final, drug)}, "5.97", "", "", ""},
	} {
		r := of(t, Preparation{Strength: conc(t, "10 mg/mL"), Assay: five, Steps: c.steps})
		if root2(r) != c.u {
			t.Errorf("%s: got u %s %%, want %s", c.name, root2(r), c.u)
		}
		if c.expanded != "" && (tenths(t, r.Expanded) != c.expanded || r.Printed.Exact() != c.expanded) {
			t.Errorf("%s: got U %s %%, printed %s %%, want %s", c.name, tenths(t, r.Expanded), r.Printed.Exact(), c.expanded)
		}
		low, high := r.Reach(r.Worst)
		if c.worstLow != "" && (tenths(t, low) != c.worstLow || tenths(t, high) != c.worstUp) {
			t.Errorf("%s: got worst case %s to %s %%, want %s to %s", c.name, tenths(t, low), tenths(t, high), c.worstLow, c.worstUp)
		}
	}
}

// TestOneReading holds the reading of 0.1 mL in a 1 mL syringe, ±17 % (the
// reference's part g; the rule for the 1 mL syringe as printed in Phillips,
// Syringe accuracy estimates for ISO 7886-1, 2016), and row A174 of the vectors
// (the same source): 4 mL in a 10 mL syringe, 0.19 mL or 4.75 %.
func TestOneReading(t *testing.T) {
	for _, c := range []struct{ volume, nominal, finalVolume, finalNominal, want string }{
		{"0.1", "1", "10", "10", "17"}, {"4", "10", "50", "50", "4.75"},
	} {
		r := of(t, Preparation{Strength: conc(t, "10 mg/mL"), Assay: Around(zeroPercent()),
			Steps: []Step{MakeUpTo(in(t, c.finalVolume, c.finalNominal), in(t, c.volume, c.nominal))}})
		if got := r.Largest; got.HalfWidth.Exact() != c.want || got.Sources[0].Part != DrugDrawn {
			t.Errorf("got %s, %s %%, want the volume drawn, %s %%", got, got.HalfWidth.Exact(), c.want)
		}
		if len(r.Contributions) != 2 {
			t.Errorf("got %d contributions, want 2: an exact assay adds none", len(r.Contributions))
		}
	}
}

// TestPublishedBudgets holds the sum of squares and the root to budgets that
// other people published.
//
// Row A175 of the vectors: 50 mL flask, University of Tartu, GUM example file,
// no date: ±0.06 mL, ±0.09 mL and ±4 °C at 2.1e-4 for each degree, all
// rectangular, u = 0.0669925 mL.
//
// EURACHEM/CITAC QUAM:2012, example A1 (from memory): 100.28 mg with u 0.05,
// purity 0.9999 with u 0.000058, 100.0 mL with u 0.07: 1002.7 mg/L with u 0.9.
// Its parts are standard uncertainties; half widths here are the root of 3 times
// as much, so squares times 3 go in.
func TestPublishedBudgets(t *testing.T) {
	flask := expandedSquare([]*big.Rat{big.NewRat(6, 100), big.NewRat(9, 100), big.NewRat(42, 1000)})
	if u := halfOf(rootUp(flask)); u.FloatString(7) != "0.0669925" {
		t.Errorf("flask: got u %s mL, want 0.0669925", u.FloatString(7))
	}
	square := new(big.Rat)
	for _, part := range [][2]int64{{5, 10028}, {58, 999900}, {7, 10000}} {
		relative := big.NewRat(part[0], part[1])
		square.Add(square, relative.Mul(relative, relative))
	}
	u := new(big.Rat).Mul(rootUp(square), big.NewRat(10027, 10))
	if u.FloatString(1) != "0.9" {
		t.Errorf("standard: got u %s mg/L, want 0.9", u.FloatString(1))
	}
}

func halfOf(r *big.Rat) *big.Rat { return new(big.Rat).Quo(r, big.NewRat(2, 1)) }

// TestRootUp is never below the root and less than one step above it.
func TestRootUp(t *testing.T) {
	step := new(big.Rat).SetFrac(big.NewInt(1), new(big.Int).Exp(big.NewInt(10), big.NewInt(rootDigits), nil))
	for _, x := range []*big.Rat{new(big.Rat), big.NewRat(1, 4), big.NewRat(2, 1), big.NewRat(1, 3), big.NewRat(107, 30000), big.NewRat(1, 1<<62)} {
		r := rootUp(x)
		if new(big.Rat).Mul(r, r).Cmp(x) < 0 {
			t.Errorf("root of %s: %s is below it", x, r)
		}
		if below := new(big.Rat).Sub(r, step); below.Sign() >= 0 && new(big.Rat).Mul(below, below).Cmp(x) >= 0 {
			t.Errorf("root of %s: %s is more than a step above it", x, r)
		}
	}
	if r := rootUp(big.NewRat(1, 4)); r.RatString() != "1/2" {
		t.Errorf("root of 1/4: got %s, want it exact", r)
	}
}

// TestPowder works amoxicillin 250 mg, 5 mL added, 0.2 mL displaced, 48.08
// mg/mL after mixing (Pharmaceutical aspects of injectable administration, 2017;
// row A081 of the vectors). The limits of the displacement are invented. By
// hand: 5 mL in a 5 mL syringe is 4 % of 5 mL, 0.2 mL, of 5.2 mL 3.846 %;
// 0.1 mL either way of the displacement 1.923 %.
func TestPowder(t *testing.T) {
	strength, err := amount(t, "250 mg").In(mL(t, "5.2"))
	if err != nil {
		t.Fatal(err)
	}
	p := Preparation{Strength: strength, Assay: Around(zeroPercent()), Powder: &Powder{Added: in(t, "5", "5"),
		Displaced: Fill{Stated: mL(t, "0.2"), Least: mL(t, "0.1"), Most: mL(t, "0.3")}}}
	r := of(t, p)
	if got := r.Stated.Exact(quantity.Milligram()); got != "625/13" {
		t.Errorf("got %s mg/mL, want 250/5.2", got)
	}
	if len(r.Contributions) != 2 || r.Contributions[0].HalfWidth.Rat().FloatString(3) != "3.846" ||
		r.Contributions[1].HalfWidth.Rat().FloatString(3) != "1.923" || r.Largest.Sources[0].Part != PowderFluid {
		t.Errorf("got %v", r.Contributions)
	}
	if low := new(big.Rat).Quo(big.NewRat(250, 1), big.NewRat(55, 10)); r.Worst.Low.Rat().Cmp(low) != 0 {
		t.Errorf("got worst low %s, want 250/(5.2 + 0.3)", r.Worst.Low.Rat())
	}
	if high := new(big.Rat).Quo(big.NewRat(250, 1), big.NewRat(49, 10)); r.Worst.High.Rat().Cmp(high) != 0 {
		t.Errorf("got worst high %s, want 250/(4.8 + 0.1)", r.Worst.High.Rat())
	}
	p.Powder.Displaced = Fill{Stated: mL(t, "0.2")}
	if r = of(t, p); len(r.NotCovered) != 1 || r.NotCovered[0] != Displacement {
		t.Errorf("got %v not covered, want the volume of the powder", r.NotCovered)
	}
}

func amount(t *testing.T, s string) quantity.Amount {
	t.Helper()
	a, err := quantity.ParseAmount(s)
	if err != nil {
		t.Fatal(err)
	}
	return a
}

// TestBag works dopamine 40 mg/mL, 5 mL added to a bag of 250 mL: 784.3137
// micrograms/mL (US prescribing information, dopamine 40 mg/mL, dilution chart,
// which leaves out the added volume; row A060). That a bag holds 5 to 20 mL more
// is invented. By hand: the drug's 4 % reach the mixture as 262.5/267.5 of it,
// the fill as 7.5/267.5.
func TestBag(t *testing.T) {
	drug := in(t, "5", "5")
	p := Preparation{Strength: conc(t, "40 mg/mL"), Assay: Around(zeroPercent()),
		Steps: []Step{AddToBag(Fill{Stated: mL(t, "250")}, drug)}}
	r := of(t, p)
	if got := r.Stated.Rat().FloatString(7); got != "0.7843137" || !r.Best.Equal(r.Stated) {
		t.Errorf("got %s mg/mL, want 0.7843137", got)
	}
	if len(r.NotCovered) != 1 || r.NotCovered[0] != BagFill {
		t.Errorf("got %v not covered, want the fill of the bag", r.NotCovered)
	}
	p.Steps = []Step{AddToBag(Fill{mL(t, "250"), mL(t, "255"), mL(t, "270")}, drug)}
	r = of(t, p)
	if want := big.NewRat(200*1000, 267500); r.Best.Rat().Cmp(want) != 0 {
		t.Errorf("got best %s mg/mL, want 200/267.5", r.Best.Rat())
	}
	if len(r.NotCovered) != 0 || r.Contributions[0].HalfWidth.Rat().Cmp(big.NewRat(4*2625, 2675)) != 0 ||
		r.Contributions[1].HalfWidth.Rat().Cmp(big.NewRat(750*100, 26750)) != 0 {
		t.Errorf("got %v", r.Contributions)
	}
	if low, high := r.Reach(r.Worst); low.Rat().Sign() >= 0 || high.Rat().Cmp(big.NewRat(4, 1)) >= 0 {
		t.Errorf("got %s to %s %% of the stated: a fuller bag must lower both ends", low.Exact(), high.Exact())
	}
}
