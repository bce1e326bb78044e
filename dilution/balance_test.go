package dilution_test

import (
	"fmt"
	"math/big"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"drawup/dilution"
	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
)

// randomSyringe is one syringe or infusion of an order, within or without the
// limits.
func randomSyringe(t *rapid.T, f *formulary.Formulary) string {
	packed := slices.DeleteFunc(slices.Clone(f.Drugs()), func(d formulary.Drug) bool { return len(d.Presentations) == 0 })
	d := rapid.SampledFrom(packed).Draw(t, "drug")
	p := rapid.SampledFrom(d.Presentations).Draw(t, "presentation")
	unit := p.Amount.Unit().String()
	amount := fmt.Sprintf("%s %s", decimal(t, "amount"), unit)
	body := lines(key("drug", d.Name), key("presentation", p.ID))
	if len(p.Diluents) > 0 && rapid.Bool().Draw(t, "diluted") {
		body += key("diluent", rapid.SampledFrom(p.Diluents).Draw(t, "diluent").Name) + "\n"
	}
	volume := rapid.SampledFrom([]string{"2 mL", "5 mL", "10 mL", "12.5 mL", "20 mL", "40 mL", "50 mL"}).Draw(t, "volume")
	if len(d.Rates) > 0 && rapid.Bool().Draw(t, "infusion") {
		r := rapid.SampledFrom(d.Rates).Draw(t, "row")
		method := rapid.SampledFrom([]string{"make up to", "add to", "withdraw, then add"}).Draw(t, "method")
		return "\n[[patient.infusion]]\n" + body + lines(key("mix", amount+" in "+volume), key("line", "central"), key("method", method),
			key("start", r.UsualHigh.Text), key("indication", r.For), key("route", r.Routes[0]))
	}
	if len(d.Doses) > 0 && rapid.Bool().Draw(t, "dose") {
		r := rapid.SampledFrom(d.Doses).Draw(t, "row")
		return "\n[[patient.syringe]]\n" + body + lines(key("dose", r.UsualHigh.Text), key("indication", r.For), key("route", r.Routes[0]))
	}
	body += key("amount", amount) + "\n"
	if rapid.Bool().Draw(t, "to a volume") {
		body += key("volume", volume) + "\n"
	}
	return "\n[[patient.syringe]]\n" + body
}

// decimal is a number as people write it, from 0.01 to 5000.
func decimal(t *rapid.T, label string) string {
	n := rapid.SampledFrom([]int{1, 2, 3, 4, 5, 8, 10, 12, 15, 20, 25, 30, 40, 50, 60, 75, 100, 125, 150, 200, 250, 400, 500, 1000, 2000, 5000}).Draw(t, label)
	return strings.TrimRight(strings.TrimRight(fmt.Sprintf("%d.%02d", n, rapid.SampledFrom([]int{0, 0, 0, 50, 25}).Draw(t, label+" part")), "0"), ".")
}

// Whatever is ordered: what is made balances exactly (rule R6), and volumes,
// amounts and concentrations agree.
func TestEveryPlanBalances(t *testing.T) {
	t.Parallel()
	f := starter(t)
	made := 0
	rapid.Check(t, func(t *rapid.T) {
		var b strings.Builder
		b.WriteString(session + adult)
		for range 40 {
			b.WriteString(randomSyringe(t, f))
		}
		list, reasons := plan(t, f, b.String())
		for _, p := range list.Plans {
			if reasons.Of(p.Number).Refused() {
				continue
			}
			made++
			balanced(t, p)
		}
	})
	t.Logf("%d syringes made", made)
	if made < 500 {
		t.Errorf("got %d syringes made, want enough to mean something", made)
	}
}

func balanced(t *rapid.T, p dilution.Plan) {
	m := p.Mixture
	ok := func(good bool, what string) {
		if !good {
			t.Fatalf("%s of %s, %s: %+v", what, p.Drug.Name, p.Presentation.ID, m)
		}
	}
	sum, err := m.Amount.Plus(m.LeftAmount)
	ok(err == nil && sum.Equal(p.Presentation.Amount.Times(m.Containers)), "amounts do not balance")
	ok(m.DrugVolume.Plus(m.LeftVolume).Cmp(p.Presentation.Volume.Times(m.Containers)) == 0, "volumes do not balance")
	ok(m.LeftVolume.Cmp(p.Presentation.Volume) < 0, "a whole container is left over")
	final := m.DrugVolume
	if m.DiluentVolume.Given() {
		final = final.Plus(m.DiluentVolume)
	}
	ok(final.Cmp(m.FinalVolume) == 0, "drug and diluent are not the whole")
	held, err := m.FinalVolume.Holds(m.Concentration)
	ok(err == nil && held.Equal(m.Amount), "concentration and volume do not give the amount")
	low, err1 := m.Low.Cmp(m.Concentration)
	high, err2 := m.High.Cmp(m.Concentration)
	ok(err1 == nil && err2 == nil && low < 0 && high > 0, "the interval does not hold the concentration")
	onMark(t, p, ok)
	if part := p.Infusion; part != nil {
		ok(part.Low.Rate.Cmp(part.Start.Rate) <= 0 && part.Start.Rate.Cmp(part.High.Rate) <= 0 || part.Start.LostPercent.Sign() != 0, "the start lies outside its range")
		ok(len(part.Ladder) >= 2, "there is no ladder")
	}
	ok(p.UseBy.Minutes > 0 && p.UseBy.At.After(p.Prepared), "no use-by time")
}

// onMark checks that what is drawn is a multiple of its barrel's step and fits.
func onMark(t *rapid.T, p dilution.Plan, ok func(bool, string)) {
	m := p.Mixture
	multiple := func(v, step quantity.Volume) bool {
		return new(big.Rat).Quo(v.Rat(), step.Rat()).IsInt()
	}
	ok(multiple(m.DrugVolume, m.DrugReading.Barrel.Step()), "the drug's volume lies between graduations")
	ok(m.DrugVolume.Cmp(m.DrugReading.Barrel.Nominal()) <= 0, "the drug's volume does not fit its barrel")
	if !m.InBag {
		ok(m.FinalVolume.Cmp(m.FinalBarrel.Nominal()) <= 0, "the final volume does not fit its barrel")
	}
	if d := p.Dose; d != nil {
		given, err := d.Volume.Holds(m.Concentration)
		ok(err == nil && given.Equal(d.Delivered), "what the dose gives is not what its volume holds")
		ok(d.Volume.Cmp(m.FinalVolume) <= 0, "the dose is more than the syringe holds")
	}
}
