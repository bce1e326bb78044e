package dilution_test

import (
	"fmt"
	"strings"
	"testing"

	"drawup/dilution"
)

// The sums below are worked in published documents; each names its own. Only
// the words of the orders are ours.

// "4 mg in 50 mL = 80 micrograms/mL" stands in a hospital intravenous guide,
// Ireland, noradrenaline. 0.1 microgram/kg/min of 70 kg is then 420
// micrograms/h, 5.25 mL/h: worked by hand, half up to the pump's 0.1 mL/h.
func TestNoradrenalineByHand(t *testing.T) {
	p := one(t, "infusion", lines(key("drug", "noradrenaline"), key("presentation", "ampoule 4 mg in 4 mL"), key("standard", "4 mg in 50 mL"),
		key("line", "central"), key("start", "0.1 microgram/kg/min")))
	want(t, "concentration", uk().Concentration(p.Mixture.Concentration), "80 micrograms/mL")
	want(t, "drug volume", uk().Volume(p.Mixture.DrugVolume), "4 mL")
	want(t, "diluent volume", uk().Volume(p.Mixture.DiluentVolume), "46 mL")
	want(t, "exact rate", uk().FlowRate(p.Infusion.Start.Exact), "5.25 mL/h")
	want(t, "pump rate", uk().FlowRate(p.Infusion.Start.Rate), "5.3 mL/h")
	// 5.3 mL/h of 80 micrograms/mL for 70 kg: 424 / 60 / 70 = 0.10095…
	want(t, "delivered", uk().DoseRate(p.Infusion.Start.Delivered), "0.101 microgram/kg/min")
	// 50 mL at 5.3 mL/h: 9.4339… h, 9 h 26 min and a part.
	if p.Infusion.Minutes != 566 {
		t.Errorf("run time: got %d min, want 566", p.Infusion.Minutes)
	}
	want(t, "standard", p.Standard, "4 mg in 50 mL")
}

// Hospital rate grid for adrenaline 2 mg in 50 mL ("Critical Care Drug
// Infusion", no date), printed to 0.1 mL/h.
func TestAdrenalineGrid(t *testing.T) {
	for _, c := range []struct{ dose, weight, rate string }{
		{"0.025", "30", "1.1"}, {"0.025", "50", "1.9"}, {"0.025", "70", "2.6"}, {"0.05", "30", "2.3"}, {"0.05", "90", "6.8"},
		{"0.075", "70", "7.9"}, {"0.1", "70", "10.5"}, {"0.125", "60", "11.3"}, {"0.15", "90", "20.3"}, {"0.175", "30", "7.9"},
		{"0.2", "80", "24"}, {"0.25", "50", "18.8"}, {"0.3", "100", "45"}, {"0.35", "70", "36.8"}, {"0.45", "90", "60.8"}, {"0.5", "60", "45"},
	} {
		patient := "\n[[patient]]\n" + lines(key("id", "A"), key("age", "40 years"), key("weight", c.weight+" kg"))
		p := oneFor(t, patient, "infusion", lines(key("drug", "adrenaline"), key("presentation", "ampoule 1 mg in 1 mL"), key("mix", "2 mg in 50 mL"),
			key("diluent", "glucose 5 %"), key("line", "central"), key("start", c.dose+" microgram/kg/min"), key("indication", "vasopressor infusion")))
		want(t, c.dose+" for "+c.weight+" kg", uk().FlowRate(p.Infusion.Start.Rate), c.rate+" mL/h")
	}
}

// Hospital intravenous guide, Ireland, remifentanil: 5 mg in 50 mL is 100
// micrograms/mL. The label of the powder: 5 mL to 5 mg, 1 mg/mL.
func TestRemifentanilFiveInFifty(t *testing.T) {
	p := one(t, "infusion", lines(key("drug", "remifentanil"), key("presentation", "vial 5 mg"), key("standard", "5 mg in 50 mL"),
		key("start", "0.1 microgram/kg/min"), key("indication", "anaesthesia, ventilated")))
	want(t, "strength", uk().Concentration(p.Mixture.Strength), "1 mg/mL")
	want(t, "concentration", uk().Concentration(p.Mixture.Concentration), "100 micrograms/mL")
	want(t, "drug volume", uk().Volume(p.Mixture.DrugVolume), "5 mL")
	if p.Mixture.Containers != 1 || p.Mixture.Method != dilution.MakeUpTo {
		t.Errorf("got %d containers, %v", p.Mixture.Containers, p.Mixture.Method)
	}
}

// UK texts: ephedrine 30 mg/mL, 1 mL made up to 10 mL, is the 3 mg/mL of the
// ready-filled syringe; two thirds of a syringe of 6 mg doses: 2 mL each.
func TestEphedrineToTenMillilitres(t *testing.T) {
	p := one(t, "syringe", lines(key("drug", "ephedrine"), key("presentation", "ampoule 30 mg in 1 mL"), key("concentration", "3 mg/mL"), key("volume", "10 mL"), key("dose", "6 mg")))
	want(t, "concentration", uk().Concentration(p.Mixture.Concentration), "3 mg/mL")
	want(t, "drug volume", uk().Volume(p.Mixture.DrugVolume), "1 mL")
	want(t, "diluent volume", uk().Volume(p.Mixture.DiluentVolume), "9 mL")
	want(t, "diluent", p.Mixture.Diluent, "sodium chloride 0.9 %")
	want(t, "one dose", uk().Volume(p.Dose.Volume), "2 mL")
	want(t, "left over", uk().Volume(p.Mixture.LeftVolume), "0 mL")
}

// UK SmPC, magnesium sulfate 50 %: 4 g are about 16 mmol; 2 mmol/mL undiluted.
func TestMagnesiumInMillimoles(t *testing.T) {
	p := one(t, "syringe", lines(key("drug", "magnesium sulfate"), key("presentation", "ampoule 5 g in 10 mL"), key("amount", "4 g"), key("volume", "20 mL"),
		key("diluent", "sodium chloride 0.9 %")))
	want(t, "amount", uk().Amount(p.Mixture.Amount), "4 g")
	want(t, "substance", uk().Amount(p.Mixture.Substance), "16 mmol")
	want(t, "drug volume", uk().Volume(p.Mixture.DrugVolume), "8 mL")
	want(t, "concentration", uk().Concentration(p.Mixture.Concentration), "200 mg/mL")
	// 0.8 mmol/mL in 20 %: UK SmPC of the 20 % injection.
	want(t, "substance per mL", uk().Concentration(p.Mixture.SubstanceConc), "0.8 mmol/mL")
	want(t, "left over", uk().Amount(p.Mixture.LeftAmount), "1 g")
}

// Children's hospital parenteral manual, Canada, rocuronium: 1 mL of 10 mg/mL
// and 9 mL of diluent make 1 mg/mL.
func TestRocuroniumOneInTen(t *testing.T) {
	p := one(t, "syringe", lines(key("drug", "rocuronium"), key("concentration", "1 mg/mL"), key("volume", "10 mL"), key("diluent", "sodium chloride 0.9 %")))
	want(t, "drug volume", uk().Volume(p.Mixture.DrugVolume), "1 mL")
	want(t, "diluent volume", uk().Volume(p.Mixture.DiluentVolume), "9 mL")
	want(t, "concentration", uk().Concentration(p.Mixture.Concentration), "1 mg/mL")
}

// The ready mixture: 2.5 mg with 0.5 mg in 1 mL, UK leaflet; always five to one.
func TestReadyMixture(t *testing.T) {
	p := one(t, "syringe", lines(key("drug", "neostigmine with glycopyrronium"), key("presentation", "ampoule 2.5 mg with 0.5 mg in 1 mL"), key("dose", "2.5 mg")))
	want(t, "amount", uk().Amount(p.Mixture.Amount), "2.5 mg")
	want(t, "second", uk().Amount(p.Mixture.SecondAmount), "500 micrograms")
	want(t, "second per mL", uk().Concentration(p.Mixture.SecondConc), "500 micrograms/mL")
	p = one(t, "syringe", lines(key("drug", "neostigmine with glycopyrronium"), key("presentation", "ampoule 2.5 mg with 0.5 mg in 1 mL"), key("dose", "3.5 mg")))
	want(t, "amount of 1.4 mL", uk().Amount(p.Mixture.Amount), "3.5 mg")
	want(t, "second of 1.4 mL", uk().Amount(p.Mixture.SecondAmount), "700 micrograms")
	if p.Mixture.Containers != 2 {
		t.Errorf("got %d ampoules for 1.4 mL of 1 mL ampoules, want 2", p.Mixture.Containers)
	}
}

// Published unit tests of a reference library for pharmacokinetics (clinPK
// 0.14.0, 2024): lean weight of Janmahasatian, man, 80 kg, 150 cm: 51.643454
// kg; ideal weight of Devine, man, 180 cm: 75.0 kg, woman, 160 cm: 52.381890
// kg; adjusted weight, man, 80 kg, 180 cm: 77.0 kg. Doses go by the weight to
// 0.1 kg.
func TestWeightsOfDoses(t *testing.T) {
	for _, c := range []struct{ sex, height, drug, dose, weight, amount string }{
		{"male", "150 cm", "etomidate", "0.3 mg/kg lean", "51.6 kg", "15.48 mg"},
		{"male", "180 cm", "suxamethonium", "1 mg/kg ideal", "75 kg", "75 mg"},
		{"female", "160 cm", "suxamethonium", "1 mg/kg ideal", "52.4 kg", "52.4 mg"},
		{"male", "180 cm", "suxamethonium", "1 mg/kg adjusted", "77 kg", "77 mg"},
		{"male", "180 cm", "suxamethonium", "1 mg/kg actual", "80 kg", "80 mg"},
	} {
		patient := "\n[[patient]]\n" + lines(key("id", "A"), key("sex", c.sex), key("age", "40 years"), key("height", c.height), key("weight", "80 kg"))
		ampoule := map[string]string{"etomidate": "ampoule 20 mg in 10 mL", "suxamethonium": "ampoule 100 mg in 2 mL"}[c.drug]
		body := lines(key("drug", c.drug), key("presentation", ampoule), key("dose", c.dose))
		p := oneFor(t, patient, "syringe", body)
		want(t, c.dose, uk().BodyWeight(p.Dose.Weight), c.weight)
		want(t, c.dose, uk().Amount(p.Dose.Amount), c.amount)
	}
}

// UK SmPC, etomidate: 0.3 mg/kg, at most 60 mg. One dose out of a drawn
// syringe: 15.48 mg of 2 mg/mL are 7.74 mL, read as 7.8 mL off a 10 mL barrel
// marked every 0.2 mL, which gives 15.6 mg.
func TestOneDoseOnTheGraduation(t *testing.T) {
	patient := "\n[[patient]]\n" + lines(key("id", "A"), key("sex", "male"), key("age", "40 years"), key("height", "150 cm"), key("weight", "80 kg"))
	p := oneFor(t, patient, "syringe", lines(key("drug", "etomidate"), key("presentation", "ampoule 20 mg in 10 mL"), key("dose", "0.3 mg/kg lean")))
	want(t, "dose", uk().Volume(p.Dose.Volume), "7.8 mL")
	want(t, "gives", uk().Amount(p.Dose.Delivered), "15.6 mg")
	want(t, "syringe holds", uk().Amount(p.Mixture.Amount), "15.6 mg")
	want(t, "left over", uk().Volume(p.Mixture.LeftVolume), "2.2 mL")
}

// ISO 7886-1 as quoted by a worked case: 4 mL read off a 10 mL syringe may be
// off by 0.19 mL, 4.75 %. With an assay of 10 % and the 10 mL at 4 %, the plain
// sum is 18.75 %; twice the root of the sum of the thirds of the squares is
// 13.6 % (GUM, rectangular distributions), and the smaller of the two counts:
// 2 × sqrt((10² + 4.75² + 4²) / 3) = 13.60.
func TestIntervalOfOneMixture(t *testing.T) {
	p := one(t, "syringe", lines(key("drug", "rocuronium"), key("concentration", "4 mg/mL"), key("volume", "10 mL"), key("diluent", "sodium chloride 0.9 %")))
	m := p.Mixture
	want(t, "drug volume", uk().Volume(m.DrugVolume), "4 mL")
	got := strings.Join([]string{uk().Volume(m.DrugReading.Barrel.Nominal()), uk().Percent(m.Assay)}, ", ")
	if !m.AssayAssumed {
		t.Error("no assay limits are stored for rocuronium; the plan must say that they are assumed")
	}
	// 4 mL is read off the smallest barrel that holds it, 5 mL: x ≥ V/2 and
	// V ≥ 5 mL, 4 % of x. 2 × sqrt((100 + 16 + 16) / 3) = 13.27.
	want(t, "barrel and assay", got, "5 mL, 10 %")
	want(t, "interval", uk().Percent(m.Interval), "13.3 %")
	want(t, "low", uk().Concentration(m.Low), "3.468 mg/mL")
	want(t, "high", uk().Concentration(m.High), "4.532 mg/mL")
}

// A dose of 0.1 microgram/kg/min for 70 kg: the readings of slips are those
// that a hand gives: per hour for per minute a sixtieth, the tenfold ten times.
func TestSlipReadingsByHand(t *testing.T) {
	p := one(t, "infusion", lines(key("drug", "noradrenaline"), key("presentation", "ampoule 4 mg in 4 mL"), key("standard", "4 mg in 50 mL"),
		key("line", "central"), key("start", "0.1 microgram/kg/min")))
	var got []string
	for _, s := range p.Infusion.Slips {
		got = append(got, fmt.Sprint(uk().FlowRate(s.Rate)))
	}
	all := strings.Join(got, "; ")
	// 5.25 × 60 = 315; 5.25 / 60 = 0.0875 → 0.1; 52.5; 0.525 → 0.5;
	// 5.25 / 0.45359237 = 11.574… → 11.6.
	for _, rate := range []string{"315 mL/h", "0.1 mL/h", "52.5 mL/h", "0.5 mL/h", "11.6 mL/h"} {
		if !strings.Contains(all, rate) {
			t.Errorf("got the slips %s, want %s among them", all, rate)
		}
	}
}
