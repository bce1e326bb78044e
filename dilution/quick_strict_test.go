package dilution_test

import (
	"math/big"
	"sync/atomic"
	"testing"

	"drawup/dilution"
	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// mixtureCodes are the refusals that concern what is mixed with what, not how it
// is measured, dosed or timed.
func mixtureCodes() map[refusal.Code]bool {
	out := map[refusal.Code]bool{}
	for _, c := range []refusal.Code{
		refusal.DrugUnknown, refusal.PresentationUnknown, refusal.PresentationUnclear, refusal.PresentationNotPump,
		refusal.DiluentForbidden, refusal.DiluentNotListed, refusal.DiluentMissing, refusal.MustBeDiluted, refusal.RouteNotListed,
		refusal.NeverAsInfusion, refusal.NeverAsBolus, refusal.FormularyBlank, refusal.DisplacementBlank,
		refusal.ConcentrationTooHigh, refusal.ConcentrationTooLow,
	} {
		out[c] = true
	}
	return out
}

// TestQuickMixAsStrictAsAnOrder orders every presentation of the starter formulary
// in many mixtures twice, as a quick sum and as a syringe of an order. What the
// quick sum lets through, the order does not refuse for its mixture (rule R10).
func TestQuickMixAsStrictAsAnOrder(t *testing.T) {
	f := starter(t)
	var tried, passed atomic.Int64
	t.Run("drugs", func(t *testing.T) {
		for _, d := range f.Drugs() {
			t.Run(d.Name, func(t *testing.T) {
				t.Parallel()
				for _, p := range d.Presentations {
					for _, infusion := range []bool{false, true} {
						all, fine := bothWays(t, f, trialOf(d, p, infusion))
						tried.Add(all)
						passed.Add(fine)
					}
				}
			})
		}
	})
	if tried.Load() < 1000 || passed.Load() < 100 {
		t.Errorf("got %d mixtures, of which %d pass; want 1000 and 100", tried.Load(), passed.Load())
	}
}

// fluidsFor are the fluids worth trying with a presentation: none, every one on
// record, and common ones that may not be.
func fluidsFor(p formulary.Presentation) []string {
	out := []string{"", "sodium chloride 0.9 %", "glucose 5 %", "water for injections"}
	for _, d := range append(append([]formulary.Diluent{}, p.Diluents...), p.Forbidden...) {
		out = append(out, d.Name)
	}
	return out
}

// A trial is one presentation for one use, by a route that there is.
type trial struct {
	drug     formulary.Drug
	stock    formulary.Presentation
	infusion bool
	route    string
	start    string // a dose rate that there is, "" for none
}

func trialOf(d formulary.Drug, p formulary.Presentation, infusion bool) trial {
	t := trial{drug: d, stock: p, infusion: infusion, route: "IV", start: "1 mg/h"}
	if infusion && len(d.Rates) > 0 {
		t.route = d.Rates[0].Routes[0]
		for _, f := range []formulary.Figure[quantity.DoseRate]{d.Rates[0].UsualHigh, d.Rates[0].SoftHigh, d.Rates[0].HardHigh} {
			if f.Given() {
				t.start = f.Text
				break
			}
		}
	}
	if !infusion && len(d.Doses) > 0 {
		t.route = d.Doses[0].Routes[0]
	}
	return t
}

// bothWays holds one container, neat and made up to twice and twenty times its
// volume with each fluid. It counts the mixtures, and those that pass as quick sums.
func bothWays(t *testing.T, f *formulary.Formulary, x trial) (tried, passed int64) {
	t.Helper()
	var sums []dilution.Quick
	var bodies []string
	table := "syringe"
	if x.infusion {
		table = "infusion"
	}
	for _, fluid := range fluidsFor(x.stock) {
		for _, times := range []*big.Rat{big.NewRat(1, 1), big.NewRat(2, 1), big.NewRat(20, 1)} {
			q := x.quick(t, fluid, times)
			sums, bodies = append(sums, q), append(bodies, x.order(fluid, q.Mix.Final))
		}
	}
	for i, order := range eachAlone(t, f, adult, table, bodies) {
		quick, _ := sums[i].Check(f)
		if quick.Refused() {
			if !order.Refused() {
				t.Errorf("%s: the quick sum refuses what an order makes: %v", bodies[i], quick.Refusals())
			}
			continue
		}
		passed++
		for _, r := range order.Refusals() {
			if mixtureCodes()[r.Code] {
				t.Errorf("%s: the quick sum lets through what an order refuses: %v", bodies[i], r)
			}
		}
	}
	return int64(len(sums)), passed
}

// quick is one container made up to so many times its volume; once is neat.
func (x trial) quick(t *testing.T, fluid string, times *big.Rat) dilution.Quick {
	t.Helper()
	p := x.stock
	drug := p.Volume
	if !drug.Given() { // a powder of unknown displacement: any volume must be refused
		drug = p.Added
	}
	final := quantity.Millilitres(new(big.Rat).Mul(drug.Rat(), times))
	conc, err := p.Amount.In(final)
	if err != nil {
		t.Fatal(err)
	}
	method := dilution.MakeUpTo
	if times.Cmp(big.NewRat(1, 1)) == 0 {
		method = dilution.Neat
	}
	return dilution.Quick{Drug: x.drug.Name, Infusion: x.infusion, Route: x.route, Line: "central", Diluent: fluid, Concentration: conc,
		Style: quantity.UK(), Mix: &dilution.QuickMix{Presentation: p.ID, Method: method, Drug: drug, Final: final}}
}

// order is the same mixture as a syringe of an order.
func (x trial) order(fluid string, final quantity.Volume) string {
	amount := x.stock.Amount.Exact(x.stock.Amount.Unit()) + " " + x.stock.Amount.Unit().String()
	rest := []string{key("amount", amount), key("volume", final.Exact()+" mL")}
	if x.infusion {
		rest = []string{key("mix", amount+" in "+final.Exact()+" mL"), key("start", x.start), key("line", "central")}
	}
	if fluid != "" {
		rest = append(rest, key("diluent", fluid))
	}
	return lines(append(rest, key("drug", x.drug.Name), key("presentation", x.stock.ID), key("route", x.route))...)
}
