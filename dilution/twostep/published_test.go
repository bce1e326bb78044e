package twostep

import (
	"testing"

	"drawup/dilution/quantity"
	"drawup/dilution/syringe"
)

// read is volume in the known barrel of a nominal capacity.
func read(t failing, volume, nominal string) syringe.Reading {
	t.Helper()
	b, ok := syringe.Find(mL(t, nominal))
	if !ok {
		t.Fatal("no barrel of " + nominal + " mL")
	}
	r, err := b.Read(mL(t, volume), mL(t, "0.01"), per(t, "0"))
	if err != nil {
		t.Fatal(err)
	}
	return r
}

// A published dilution in two steps: what is drawn, made up to, taken, made up
// to, and the concentrations that the source gives (or, where it gives a rule
// for each kilogram, those of a child of the weight named).
type published struct {
	name                   string
	strength               string
	draw, make, take, give [2]string
	intermediate, final    string
	source                 string
}

// publishedPlans are hospital guidelines for insulin 100 units/mL in the newborn,
// seen as stored copies; row A121 of the vectors; which syringe measures what is
// ours. Row A120, of kind two-step in the vectors (22.5 mL of 200 mg in 5 mL is 900
// mg), has no intermediate dilution, and row A073 mixes a powder and fills 100
// mL: neither is a case for an intermediate syringe.
func publishedPlans() []published {
	return []published{
		{"newborn, 1 kg, double strength", "100 units/mL", [2]string{"0.6", "1"}, [2]string{"30", "30"}, [2]string{"5", "5"}, [2]string{"50", "50"},
			"2 units/mL", "0.2 units/mL", "Neonatal intensive care drug manual of an Australian hospital, n.d.: 60 units (0.6 mL) to 30 mL, then 5 mL/kg to 50 mL"},
		{"newborn, 1 kg, single strength", "100 units/mL", [2]string{"0.6", "1"}, [2]string{"30", "30"}, [2]string{"2.5", "3"}, [2]string{"50", "50"},
			"2 units/mL", "0.1 units/mL", "the same, first step from the double strength: 2.5 mL/kg (5 units/kg) to 50 mL, 0.1 unit/kg in each mL"},
		{"newborn, 1.2 kg, 0.05 units/kg/h at 1 mL/h", "100 units/mL", [2]string{"0.5", "1"}, [2]string{"50", "50"}, [2]string{"3", "5"}, [2]string{"50", "50"},
			"1 units/mL", "0.06 units/mL", "New Zealand newborn services, insulin administration, 2002: 50 units (0.5 mL) and 49.5 mL, then 50 x kg x dose / rate units to 50 mL"},
		{"newborn, 1 kg, amount not measurable at once", "100 units/mL", [2]string{"0.1", "1"}, [2]string{"1", "1"}, [2]string{"0.5", "1"}, [2]string{"50", "50"},
			"10 units/mL", "0.1 units/mL", "Australian neonatal retrieval service, medication guideline, n.d.: 0.1 mL and 0.9 mL, then 5 units/kg to 50 mL"},
	}
}

// TestPublished works the published readings, and finds for each target a plan
// of its own that is no worse by any figure of the order.
func TestPublished(t *testing.T) {
	for _, c := range publishedPlans() {
		p, err := Work(conc(t, c.strength), Readings{read(t, c.draw[0], c.draw[1]), read(t, c.make[0], c.make[1]),
			read(t, c.take[0], c.take[1]), read(t, c.give[0], c.give[1])})
		if err != nil {
			t.Errorf("%s: %v (%s)", c.name, err, c.source)
			continue
		}
		if !p.Intermediate.Concentration.Equal(conc(t, c.intermediate)) || !p.Final.Concentration.Equal(conc(t, c.final)) {
			t.Errorf("%s: got %s, then %s units/mL, want %s, then %s (%s)", c.name, p.Intermediate.Concentration.Rat().RatString(),
				p.Final.Concentration.Rat().RatString(), c.intermediate, c.final, c.source)
		}
		w := wanted(t, c.strength, c.final, c.give[0])
		w.Barrels = syringe.Known()
		f, err := Find(w)
		if err != nil {
			t.Errorf("%s: %v", c.name, err)
			continue
		}
		p.Error = offBy(p.Final.Concentration, w.Concentration)
		if judged(p).before(judged(f.Plan), byRule) {
			t.Errorf("%s: the published plan, %s, is better than the one found, %s", c.name, judged(p), judged(f.Plan))
		}
	}
}

// TestMorphine is row A121 of the vectors: morphine 10 mg/mL diluted to 1 mg/mL,
// of which 0.1 mL holds 100 micrograms (Baker, Rutherford, Myles, Accuracy of
// dilution of morphine for intrathecal use, Anaesth Intensive Care
// 2007;35:378-381). What it is made up to after that is ours.
func TestMorphine(t *testing.T) {
	p, err := Work(conc(t, "10 mg/mL"), Readings{read(t, "1", "1"), read(t, "10", "10"), read(t, "0.1", "1"), read(t, "2", "2")})
	if err != nil {
		t.Fatal(err)
	}
	if !p.Intermediate.Concentration.Equal(conc(t, "1 mg/mL")) || p.Final.Amount.Exact(quantity.Microgram()) != "100" {
		t.Errorf("got %s micrograms of %s mg/mL", p.Final.Amount.Exact(quantity.Microgram()), p.Intermediate.Concentration.Exact(quantity.Milligram()))
	}
	if p.LeftAmount.Exact(quantity.Milligram()) != "9.9" || p.LeftVolume.Exact() != "9.9" {
		t.Errorf("got %s mg in %s mL left, want 9.9 mg in 9.9 mL", p.LeftAmount.Exact(quantity.Milligram()), p.LeftVolume.Exact())
	}
}
