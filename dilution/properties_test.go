package dilution_test

import (
	"flag"
	"fmt"
	"math/big"
	"math/rand/v2"
	"slices"
	"strings"
	"sync/atomic"
	"testing"

	"pgregory.net/rapid"

	"drawup/dilution"
	"drawup/dilution/formulary"
	"drawup/dilution/order"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// plans is how many plans the balance is held for.
var plans = flag.Int("plans", 10000, "plans made by the test of the mass balance")

// field is a value with the text that it reads from, as an order file gives it.
func field[T any](text string, parse func(string) (T, error)) order.Field[T] {
	v, err := parse(text)
	if err != nil {
		panic(err) // a fault of the generator
	}
	return order.Field[T]{Value: v, Text: text}
}

// hundredths is n/100 as people write it.
func hundredths(n int64) string {
	r := big.NewRat(n, 100)
	return strings.TrimSuffix(strings.TrimRight(r.FloatString(2), "0"), ".")
}

// randomOrder is one syringe of an invented drug; most of what it asks for can be
// made of one or two mg/mL.
func randomOrder(r *rand.Rand, number int) order.Syringe {
	s := order.Syringe{Number: number, Drug: order.Field[string]{Value: "drug aa", Text: "drug aa"}}
	mg := func(n int64) string { return hundredths(n) + " mg" }
	amount := 100 * int64(1+r.IntN(20))
	if r.IntN(4) == 0 {
		amount += int64(r.IntN(100)) // mostly between lines
	}
	volume := []string{"5 mL", "10 mL", "20 mL", "50 mL"}[r.IntN(4)]
	switch n := r.IntN(40); {
	case n < 10:
		s.Amount = field(mg(amount), quantity.ParseAmount)
	case n < 19:
		s.Amount, s.Volume = field(mg(amount), quantity.ParseAmount), field(volume, quantity.ParseVolume)
	case n < 23:
		s.Concentration, s.Volume = field(mg(20*int64(1+r.IntN(5)))+"/mL", quantity.ParseConcentration), field(volume, quantity.ParseVolume)
	case n < 34:
		s.Dose = field(mg(amount), quantity.ParseDose)
	case n < 39:
		s.Dose, s.Doses = field(mg(20*int64(1+r.IntN(20))), quantity.ParseDose), order.Field[int]{Value: 2 + r.IntN(4), Text: "n"}
	default:
		s.Dose, s.Dilute = field(mg(int64(1+r.IntN(9))), quantity.ParseDose), order.Field[bool]{Value: true, Text: "true"}
	}
	return s
}

// randomShelf is some of the strengths and sizes, some of them counted.
func randomShelf(r *rand.Rand, f *formulary.Formulary) order.Shelf {
	text := barrels
	for i, p := range f.Drugs()[0].Presentations {
		if i == 0 || r.IntN(3) > 0 {
			count := ""
			if r.IntN(8) == 0 {
				count = fmt.Sprint(1 + r.IntN(400))
			}
			text += stocked("drug aa", p.ID, count)
		}
	}
	s, faults := order.ReadShelf("shelf.toml", []byte(text))
	if faults.Refused() {
		panic(faults)
	}
	return s
}

// inMemory is an order of so many random syringes for one adult.
func inMemory(r *rand.Rand, n int) order.Order {
	o := order.Order{Patients: []order.Patient{{ID: order.Field[string]{Value: "A", Text: "A"}, Weight: field("70 kg", quantity.ParseBodyWeight)}}}
	for i := range n {
		o.Syringes = append(o.Syringes, randomOrder(r, i+1))
	}
	return o
}

// Mass balance is exact (rule R6) in 100,000 plans and more, whatever is ordered
// from whatever shelf: containers of several sizes, so many doses, dilutions. The
// sums here are the test's own. .ci/run asks for all of them, go test for a tenth:
//
//	go test ./dilution -run MassBalance -plans 100000
func TestMassBalanceOverManyPlans(t *testing.T) {
	f := inventedFormulary(t, 1, 2, 2, 5, 10)
	lists := *plans / 900 // about one order in ten cannot be made
	var made, mixed, doses, diluted atomic.Int64
	t.Run("lists", func(t *testing.T) {
		for i := range lists {
			seed := rapid.Uint64().Example(i)
			t.Run(fmt.Sprint(seed), func(t *testing.T) {
				t.Parallel()
				for _, p := range madeFrom(rand.New(rand.NewPCG(seed, 3)), f, 1000, i%4 == 0) {
					made.Add(1)
					mixed.Add(one64(p.Mixture.Mixed()))
					doses.Add(one64(p.Order.Doses.Given()))
					diluted.Add(one64(p.Order.Dilute.Value && p.Settled.Concentration.Given()))
					if why := unbalanced(p); why != "" {
						t.Fatalf("syringe %d: %s: %+v", p.Number, why, p.Mixture)
					}
				}
			})
		}
	})
	t.Logf("%d plans, %d of several sizes of container, %d of several doses, %d diluted to be measured", made.Load(), mixed.Load(), doses.Load(), diluted.Load())
	if n := int64(*plans); made.Load() < n || mixed.Load() < n/100 || doses.Load() < n/20 || diluted.Load() < n/200 {
		t.Errorf("got too few plans of a kind, want %d in all", n)
	}
}

func one64(b bool) int64 {
	if b {
		return 1
	}
	return 0
}

// madeFrom is the plans that can be made of so many random orders, from a random
// shelf or from presentations that the orders name.
func madeFrom(r *rand.Rand, f *formulary.Formulary, n int, shelved bool) []dilution.Plan {
	o, b := inMemory(r, n), dilution.Bench{}
	if shelved {
		s := randomShelf(r, f)
		b.Shelf = &s
	} else {
		all := f.Drugs()[0].Presentations
		for i := range o.Syringes {
			id := all[r.IntN(len(all))].ID
			o.Syringes[i].Presentation = order.Field[string]{Value: id, Text: id}
		}
	}
	list, reasons := b.NewList(o, f, at(2026, 12, 1, 7, 30), nil, nil)
	refused := map[int]bool{}
	for _, x := range reasons.Refusals() {
		refused[x.Syringe] = true
	}
	return slices.DeleteFunc(list.Plans, func(p dilution.Plan) bool { return refused[p.Number] })
}

// unbalanced says what does not add up in a plan, "" when all does.
func unbalanced(p dilution.Plan) string {
	m := p.Mixture
	taken, space, count := new(big.Rat), new(big.Rat), 0
	smallest := new(big.Rat)
	for i, pack := range m.Packs {
		n := big.NewRat(int64(pack.Count), 1)
		taken.Add(taken, new(big.Rat).Mul(n, pack.Presentation.Amount.Rat()))
		space.Add(space, new(big.Rat).Mul(n, pack.Presentation.Volume.Rat()))
		count += pack.Count
		if v := pack.Presentation.Volume.Rat(); i == 0 || v.Cmp(smallest) < 0 {
			smallest = v
		}
	}
	plus := func(a, b *big.Rat) *big.Rat { return new(big.Rat).Add(a, b) }
	times := func(a, b *big.Rat) *big.Rat { return new(big.Rat).Mul(a, b) }
	final := m.DrugVolume.Rat()
	if m.DiluentVolume.Given() {
		final = plus(final, m.DiluentVolume.Rat())
	}
	switch {
	case count != m.Containers || count == 0:
		return "the containers are not counted"
	case plus(m.Amount.Rat(), m.LeftAmount.Rat()).Cmp(taken) != 0:
		return "amounts do not balance"
	case plus(m.DrugVolume.Rat(), m.LeftVolume.Rat()).Cmp(space) != 0:
		return "volumes do not balance"
	case m.LeftVolume.Rat().Cmp(smallest) >= 0:
		return "a whole container is left over"
	case final.Cmp(m.FinalVolume.Rat()) != 0:
		return "drug and diluent are not the whole"
	case times(m.Concentration.Rat(), m.FinalVolume.Rat()).Cmp(m.Amount.Rat()) != 0:
		return "the concentration does not give the amount"
	case !new(big.Rat).Quo(m.DrugVolume.Rat(), m.DrugReading.Barrel.Step().Rat()).IsInt():
		return "the drug is read between lines"
	case m.FinalVolume.Cmp(m.FinalBarrel.Nominal()) > 0 || m.DrugVolume.Cmp(m.DrugReading.Barrel.Nominal()) > 0:
		return "a syringe overflows"
	}
	if d := p.Dose; d != nil {
		n := max(1, p.Order.Doses.Value)
		if times(d.Volume.Rat(), m.Concentration.Rat()).Cmp(d.Delivered.Rat()) != 0 {
			return "the dose does not hold what it gives"
		}
		if times(d.Volume.Rat(), big.NewRat(int64(n), 1)).Cmp(m.FinalVolume.Rat()) > 0 {
			return "the last dose is not whole"
		}
	}
	return ""
}

// planOne plans one syringe from a shelf; nil when it is refused.
func planOne(s *order.Shelf, f *formulary.Formulary, y order.Syringe) (*dilution.Plan, refusal.List) {
	o := inMemory(rand.New(rand.NewPCG(1, 1)), 0)
	y.Number = 1
	o.Syringes = []order.Syringe{y}
	list, reasons := dilution.Bench{Shelf: s, Explain: true}.NewList(o, f, at(2026, 12, 1, 7, 30), nil, nil)
	if reasons.Refused() || len(list.Plans) != 1 {
		return nil, reasons
	}
	return &list.Plans[0], reasons
}

// Double the amount and the volume double what is drawn and added, and leave the
// concentration as it is, wherever both stand on lines.
func TestScaling(t *testing.T) {
	f := inventedFormulary(t, 1, 2, 2, 5, 10)
	compared := 0
	rapid.Check(t, func(t *rapid.T) {
		r := rand.New(rand.NewPCG(rapid.Uint64().Draw(t, "seed"), 7))
		s := randomShelf(r, f)
		for range 12 {
			n := 50 * int64(1+r.IntN(100))
			v := []int64{200, 500, 1000, 2000}[r.IntN(4)]
			ask := func(k int64) order.Syringe {
				y := order.Syringe{Drug: order.Field[string]{Value: "drug aa", Text: "drug aa"}}
				y.Amount, y.Volume = field(hundredths(k*n)+" mg", quantity.ParseAmount), field(hundredths(k*v)+" mL", quantity.ParseVolume)
				return y
			}
			a, _ := planOne(&s, f, ask(1))
			b, _ := planOne(&s, f, ask(2))
			if a == nil || b == nil || a.Presentation.ID == "" || !sameStrength(*a, *b) ||
				a.Mixture.DrugReading.MovedPercent.Sign() != 0 || b.Mixture.DrugReading.MovedPercent.Sign() != 0 {
				continue
			}
			compared++
			x, y := a.Mixture, b.Mixture
			if !x.Concentration.Equal(y.Concentration) || !x.Amount.Times(2).Equal(y.Amount) || x.DrugVolume.Times(2).Cmp(y.DrugVolume) != 0 || x.FinalVolume.Times(2).Cmp(y.FinalVolume) != 0 {
				t.Fatalf("%d hundredths of a mg in %d of a mL, and the double:\n%+v\n%+v", n, v, x, y)
			}
		}
	})
	if compared < 50 {
		t.Errorf("got %d pairs to compare, want enough to mean something", compared)
	}
}

func sameStrength(a, b dilution.Plan) bool { return a.Mixture.Strength.Equal(b.Mixture.Strength) }

// The same order in mg, in micrograms and in grams gives the same plan: every
// exact figure, every choice with its reason, every code.
func TestUnitInvariance(t *testing.T) {
	f := inventedFormulary(t, 1, 2, 2, 5, 10)
	rapid.Check(t, func(t *rapid.T) {
		r := rand.New(rand.NewPCG(rapid.Uint64().Draw(t, "seed"), 11))
		s := randomShelf(r, f)
		for i := range 6 {
			y := randomOrder(r, 1)
			a, reasons := planOne(&s, f, y)
			for _, unit := range []string{"microgram", "g"} {
				b, others := planOne(&s, f, inUnit(y, unit))
				if (a == nil) != (b == nil) || !slices.Equal(reasons.Codes(), others.Codes()) {
					t.Fatalf("order %d in mg and in %s: %v\n%v", i, unit, reasons, others)
				}
				if a != nil && sumsOf(*a) != sumsOf(*b) {
					t.Fatalf("order %d in mg and in %s:\n%s\n%s", i, unit, sumsOf(*a), sumsOf(*b))
				}
			}
		}
	})
}

// inUnit is the order with its amounts written in another unit of mass.
func inUnit(y order.Syringe, unit string) order.Syringe {
	by := map[string]*big.Rat{"microgram": big.NewRat(1000, 1), "g": big.NewRat(1, 1000)}[unit]
	text := func(mg *big.Rat) string {
		x := new(big.Rat).Mul(mg, by)
		return strings.TrimSuffix(strings.TrimRight(x.FloatString(6), "0"), ".") + " " + unit
	}
	if y.Amount.Given() {
		y.Amount = field(text(y.Amount.Value.Rat()), quantity.ParseAmount)
	}
	if y.Dose.Given() {
		y.Dose = field(text(y.Dose.Value.Rat()), quantity.ParseDose)
	}
	if y.Concentration.Given() {
		y.Concentration = field(text(y.Concentration.Value.Rat())+"/mL", quantity.ParseConcentration)
	}
	return y
}

// sumsOf is every figure of a plan, exact, and its choices, as text.
func sumsOf(p dilution.Plan) string {
	m := p.Mixture
	parts := []string{m.Method.String(), m.Diluent, fmt.Sprint(m.Containers), m.DrugVolume.Exact(), m.DiluentVolume.Exact(), m.FinalVolume.Exact(),
		m.DrugReading.Barrel.Nominal().Exact(), m.FinalBarrel.Nominal().Exact(), m.Amount.Rat().RatString(), m.Concentration.Rat().RatString(),
		m.LeftVolume.Exact(), m.LeftAmount.Rat().RatString(), m.Interval.Exact(), p.Style.Amount(m.Amount), p.Style.Concentration(m.Concentration)}
	if d := p.Dose; d != nil {
		parts = append(parts, d.Amount.Rat().RatString(), d.Volume.Exact(), d.Delivered.Rat().RatString(), p.Style.Amount(d.Delivered))
	}
	for _, c := range p.Choices {
		parts = append(parts, fmt.Sprintf("%+v", c))
	}
	return strings.Join(parts, " | ")
}

// Limits are monotone: above a dose that is too much every larger one is too
// much, below one that is too little every smaller one is; and what a site that
// measures down to 0.3 mL makes, one that measures down to 0.1 mL makes too.
func TestMonotoneLimits(t *testing.T) {
	f := starter(t)
	type rowOfDoses struct {
		drug formulary.Drug
		rule formulary.Rule[quantity.Dose]
	}
	var rows []rowOfDoses
	for _, d := range f.Drugs() {
		for _, x := range d.Doses {
			if x.UsualHigh.Given() && x.UsualHigh.Value.Basis() == quantity.Absolute && x.Fits(adultAge(t)) {
				rows = append(rows, rowOfDoses{d, x})
			}
		}
	}
	rank := func(x rowOfDoses, dose *big.Rat) int {
		u := x.rule.UsualHigh.Value.Unit()
		text := strings.TrimSuffix(strings.TrimRight(dose.FloatString(6), "0"), ".") + " " + u.String()
		reasons, _ := dilution.Quick{Drug: x.drug.Name, Indication: x.rule.For, Route: x.rule.Routes[0], Age: adultAge(t), Style: uk(),
			Dose: field(text, quantity.ParseDose).Value}.Check(f)
		if reasons.Refused() {
			return 1
		}
		return 0
	}
	rapid.Check(t, func(t *rapid.T) {
		x := rapid.SampledFrom(rows).Draw(t, "row")
		u := quantity.AmountOf(big.NewRat(1, 1), x.rule.UsualHigh.Value.Unit())
		top := new(big.Rat).Quo(x.rule.UsualHigh.Value.Rat(), u.Rat())
		a := new(big.Rat).Mul(top, big.NewRat(rapid.Int64Range(100, 5000).Draw(t, "above"), 100))
		b := new(big.Rat).Mul(a, big.NewRat(rapid.Int64Range(101, 2000).Draw(t, "further"), 100))
		if rank(x, a) > rank(x, b) {
			t.Fatalf("%s for %s: %s is refused and %s is not", x.drug.Name, x.rule.For, a.FloatString(4), b.FloatString(4))
		}
		low := new(big.Rat).Quo(top, big.NewRat(rapid.Int64Range(1, 2000).Draw(t, "below"), 1))
		lower := new(big.Rat).Quo(low, big.NewRat(rapid.Int64Range(2, 20).Draw(t, "deeper"), 1))
		if n, err := x.rule.UsualLow.Value.Cmp(x.rule.UsualHigh.Value); x.rule.UsualLow.Given() && err == nil && n <= 0 &&
			new(big.Rat).Mul(low, u.Rat()).Cmp(x.rule.UsualLow.Value.Rat()) <= 0 && rank(x, low) > rank(x, lower) {
			t.Fatalf("%s for %s: %s is refused and %s is not", x.drug.Name, x.rule.For, low.FloatString(6), lower.FloatString(6))
		}
	})
}

// What can be measured under a stricter site can be measured under a looser one.
func TestMonotoneSites(t *testing.T) {
	f := inventedFormulary(t, 1, 2, 2, 5, 10)
	rapid.Check(t, func(t *rapid.T) {
		r := rand.New(rand.NewPCG(rapid.Uint64().Draw(t, "seed"), 13))
		s := randomShelf(r, f)
		o := inMemory(r, 20)
		made := func(smallest, tolerance string) map[int]bool {
			o.Site.Smallest, o.Site.Tolerance = field(smallest, quantity.ParseVolume), field(tolerance, quantity.ParsePercent)
			list, reasons := dilution.Bench{Shelf: &s}.NewList(o, f, at(2026, 12, 1, 7, 30), nil, nil)
			out := map[int]bool{}
			for _, p := range list.Plans {
				out[p.Number] = !reasons.Of(p.Number).Refused()
			}
			return out
		}
		strict, loose := made("0.3 mL", "2 %"), made("0.1 mL", "5 %")
		for n := range strict {
			// What is counted on the shelf runs out sooner where more is made.
			if strict[n] && !loose[n] && !counted(s) {
				t.Fatalf("syringe %d: made by the strict site and refused by the loose one: %+v", n, o.Syringes[n-1])
			}
		}
	})
}

func counted(s order.Shelf) bool {
	return slices.ContainsFunc(s.Stock, func(x order.Stocked) bool { return x.Count.Given() })
}
