package dilution_test

import (
	"slices"
	"strings"
	"testing"

	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// Enough for so many doses, as the giving syringe shows them. By hand: 6 doses of
// 2 mg at 1 mg/mL are 12 mL. 3 doses of 7 mg at 2 mg/mL are 3.5 mL each; 10.5 mL
// go into the 20 mL barrel, which shows 4 mL: 14.3 % off, too far. 4 doses of 2.2
// mg at 2 mg/mL are 1.1 mL each, 1.2 mL on the 5 mL barrel (9.1 % off, too far),
// 1.2 mL on the 10 mL barrel the same. 3 of 10.1 mg: 5.05 mL; the 20 mL barrel
// shows 5 mL, 1 % less, and 3 doses are 15 mL.
func TestDoses(t *testing.T) {
	for _, c := range []struct{ body, volume, dose, amount string }{
		{lines(key("drug", "morphine"), key("presentation", "ampoule 10 mg in 1 mL"), key("dose", "2 mg"), "doses = 6", key("concentration", "1 mg/mL"),
			key("diluent", "sodium chloride 0.9 %"), key("indication", "pain")), "12", "2", "12"},
		{lines(key("drug", "etomidate"), key("presentation", "ampoule 20 mg in 10 mL"), key("dose", "10.1 mg"), "doses = 3"), "15", "5", "30"},
		{lines(key("drug", "etomidate"), key("presentation", "ampoule 20 mg in 10 mL"), key("dose", "20 mg"), "doses = 1"), "10", "10", "20"},
		{lines(key("drug", "ephedrine"), key("presentation", "syringe 30 mg in 10 mL"), key("dose", "6 mg"), "doses = 5"), "10", "2", "30"},
		{lines(key("drug", "ephedrine"), key("presentation", "ampoule 30 mg in 1 mL"), key("dose", "6 mg"), "doses = 5", key("volume", "10 mL")), "10", "2", "30"},
	} {
		p := one(t, "syringe", c.body)
		m := p.Mixture
		want(t, "volume", m.FinalVolume.Exact(), c.volume)
		want(t, "one dose", p.Dose.Volume.Exact(), c.dose)
		want(t, "amount", m.Amount.Exact(quantity.Milligram()), c.amount)
	}
	for name, codes := range map[string][]refusal.Code{
		lines(key("drug", "etomidate"), key("presentation", "ampoule 20 mg in 10 mL"), key("dose", "7 mg"), "doses = 3"):   {refusal.VolumeOffGraduation},
		lines(key("drug", "etomidate"), key("presentation", "ampoule 20 mg in 10 mL"), key("dose", "20 mg"), "doses = 90"): {refusal.VolumeAboveSyringe},
		// A third of 10 mL is read as 3.4 mL, and three of them are 10.2 mL.
		lines(key("drug", "morphine"), key("presentation", "ampoule 10 mg in 1 mL"), key("dose", "3.33 mg"), "doses = 3", key("volume", "10 mL"),
			key("indication", "pain"), key("diluent", "sodium chloride 0.9 %")): {refusal.ContradictoryAmounts},
	} {
		if got := codesOf(t, starter(t), adult, "syringe", name); !slices.Equal(got, codes) {
			t.Errorf("%s: got %v, want %v", name, got, codes)
		}
	}
}

// So many hours at the start rate, with what fills the line and stays behind. By
// hand: 70 kg by lean weight are 43.8 kg (Janmahasatian 2005); 0.05 mg/kg/h are
// 2.19 mg/h, 2.2 mL/h of 1 mg/mL by the pump's step. 6 h are 13.2 mL, and 2 mL in
// the line and 0.5 mL that stay behind make 15.7, so 16 mL. Without them 14 mL.
// 24 h are 52.8 mL: no syringe.
func TestHours(t *testing.T) {
	order := func(more ...string) string {
		return lines(append([]string{key("drug", "midazolam"), key("presentation", "ampoule 10 mg in 2 mL"), key("diluent", "sodium chloride 0.9 %"),
			key("start", "0.05 mg/kg/h")}, more...)...)
	}
	p := one(t, "infusion", order(key("concentration", "1 mg/mL"), key("hours", "6 h"), key("priming", "2 mL"), key("dead_space", "0.5 mL")))
	want(t, "volume", p.Mixture.FinalVolume.Exact(), "16")
	want(t, "amount", p.Mixture.Amount.Exact(quantity.Milligram()), "16")
	// 16 - 2.5 = 13.5 mL at 2.2 mL/h are 6 h 8 min.
	if i := p.Infusion; i.Usable != 368 || i.Wanted != 360 || i.Minutes != 436 || !i.CountsOff() {
		t.Errorf("got %d min usable of %d, %d wanted", i.Usable, i.Minutes, i.Wanted)
	}
	p = one(t, "infusion", order(key("concentration", "1 mg/mL"), key("hours", "6 h")))
	want(t, "nothing counted off", p.Mixture.FinalVolume.Exact(), "14")
	if p.Infusion.CountsOff() || p.Infusion.Usable != p.Infusion.Minutes {
		t.Errorf("got %+v counted off, want nothing", p.Infusion)
	}
	for body, code := range map[string]refusal.Code{
		order(key("concentration", "1 mg/mL"), key("hours", "24 h")):                         refusal.VolumeAboveSyringe,
		order(key("mix", "50 mg in 50 mL"), key("hours", "24 h")):                            refusal.HoursNotReached,
		order(key("mix", "50 mg in 50 mL"), key("hours", "22 h"), key("priming", "3 mL")):    refusal.HoursNotReached,
		order(key("mix", "50 mg in 50 mL"), key("hours", "2 h"), key("dead_space", "50 mL")): refusal.ContradictoryAmounts,
	} {
		if got := codesOf(t, starter(t), adult, "infusion", body); !slices.Equal(got, []refusal.Code{code}) {
			t.Errorf("%s: got %v, want %v", body, got, code)
		}
	}
	// Hours alone: 50 mg in 50 mL lasts 22 h 43 min, so 100 mg in 50 mL for 24 h.
	for hours, standard := range map[string]string{"22 h": "50 mg in 50 mL", "24 h": "100 mg in 50 mL"} {
		p := one(t, "infusion", order(key("hours", hours)))
		want(t, hours, p.Standard, standard)
		want(t, hours, p.Settled.Standard.Value+p.Order.Standard.Value, standard)
	}
}

// Dead space on the shelf counts where the order asks for hours, and a smaller
// start rate than a pump step is refused as in any order.
func TestDeadSpaceOfTheShelf(t *testing.T) {
	text := strings.Replace(barrels, "size = \"20 mL\"\n", "size = \"20 mL\"\ndead_space = \"0.15 mL\"\n", 1) + stocked("midazolam", "ampoule 10 mg in 2 mL", "")
	body := lines(key("drug", "midazolam"), key("concentration", "1 mg/mL"), key("hours", "6 h"), key("diluent", "sodium chloride 0.9 %"), key("start", "0.05 mg/kg/h"))
	p := made(t, text, "infusion", body)
	want(t, "dead space", p.Infusion.DeadSpace.Exact(), "0.15")
	want(t, "13.2 and 0.15 mL", p.Mixture.FinalVolume.Exact(), "14")
	p = made(t, text, "infusion", strings.Replace(body, key("hours", "6 h"), key("volume", "20 mL"), 1))
	if p.Infusion.CountsOff() {
		t.Errorf("got %s mL counted off, want nothing where nobody asks", p.Infusion.DeadSpace.Exact())
	}
}

// An order by weight: 0.6 mg for each kg in 50 mL, 1 mL/h gives 0.2
// microgram/kg/min. By hand at 70 kg: 42 mg, 42 mL of 1 mg/mL; 0.1
// microgram/kg/min start at 0.5 mL/h. The nearest of 80, 160 and 320
// micrograms/mL to 840 is the last.
func TestOneWeight(t *testing.T) {
	order := func(more ...string) string {
		return lines(append([]string{key("drug", "noradrenaline"), key("presentation", "ampoule 10 mg in 10 mL"), key("diluent", "glucose 5 %"), key("line", "central")}, more...)...)
	}
	const child = "\n[[patient]]\nid = \"B\"\nsex = \"male\"\nage = \"2 months\"\nheight = \"55 cm\"\nweight = \"3.6 kg\"\n"
	p := oneFor(t, child, "infusion", order(key("mixture", "rule of three"), key("one_ml_per_hour", "0.2 microgram/kg/min"), key("start", "0.1 microgram/kg/min")))
	// 0.6 mg x 3.6 = 2.16 mg, 2.2 mL on the 5 mL barrel.
	want(t, "rule", p.Infusion.RuleAmount.Exact(quantity.Milligram()), "2.16")
	want(t, "drawn", p.Mixture.DrugVolume.Exact(), "2.2")
	want(t, "volume", p.Mixture.FinalVolume.Exact(), "50")
	i := slices.IndexFunc(p.Cautions, func(r refusal.Reason) bool { return r.Code == refusal.MadeForOneWeight })
	if i < 0 || !strings.Contains(p.Cautions[i].Message, "3.6 kg") || !strings.Contains(p.Cautions[i].Message, `"4 mg in 50 mL"`) {
		t.Errorf("got %v, want the weight and the nearest standard, 80 micrograms/mL beside 44", p.Cautions)
	}
	// The rule of six makes 100 mL, which no syringe holds; 50 mL of the same can be
	// made, and the refusal says so.
	_, reasons := plan(t, starter(t), session+child+"[[patient.infusion]]\n"+order(key("mixture", "rule of six"), key("one_ml_per_hour", "0.2 microgram/kg/min"), key("start", "0.1 microgram/kg/min")))
	refused := reasons.Refusals()
	if len(refused) != 1 || refused[0].Code != refusal.VolumeAboveSyringe || refused[0].Instead == nil || refused[0].Instead.FinalVolume.Exact != "50" ||
		!slices.Equal(refused[0].Instead.Write, []refusal.Line{{Key: "volume", Value: "50 mL"}}) {
		t.Errorf("got %+v", refused)
	}
	// Held against every bound like any mixture: 3 mg for each of 70 kg in 50 mL.
	if got := codesOf(t, starter(t), adult, "infusion", order(key("mixture", "rule of three"), key("start", "0.1 microgram/kg/min"))); len(got) == 0 {
		t.Error("4.2 mg/mL of noradrenaline: got it made")
	}
}

// A dose too small to measure is diluted when the order allows it. By hand: 36
// micrograms are 0.09 mL of 400 micrograms/mL. 0.25 mL made up to 1 mL are 100
// micrograms/mL, and the dose is 0.36 mL. Total error: ISO 7886-1, 1 mL barrel,
// 0.015 mL and 2 % below half, 5 % from half on: 8 % of 0.25 mL, 5 % of 1 mL, 6.17
// % of 0.36 mL, 19.2 % together. The next best whole container, 1 mL made up to 2
// mL, gives 0.18 mL, on no line of 0.1 mL within 5 %.
func TestDilutedToMeasure(t *testing.T) {
	const child = "\n[[patient]]\nid = \"B\"\nsex = \"male\"\nage = \"2 months\"\nheight = \"55 cm\"\nweight = \"3.6 kg\"\n"
	body := lines(key("drug", "naloxone"), key("dose", "10 microgram/kg"), "dilute_if_needed = true", key("indication", "after surgery"), key("diluent", "sodium chloride 0.9 %"))
	p := oneFor(t, child, "syringe", body)
	m := p.Mixture
	want(t, "drawn", m.DrugVolume.Exact(), "0.25")
	want(t, "in all", m.FinalVolume.Exact()+" on "+m.FinalBarrel.Nominal().Exact(), "1 on 1")
	want(t, "concentration", m.Concentration.Exact(quantity.Microgram()), "100")
	want(t, "dose", p.Dose.Volume.Exact()+" gives "+p.Dose.Delivered.Exact(quantity.Microgram()), "0.36 gives 36")
	if !slices.Contains(p.Cautions.Codes(), refusal.DilutedToMeasure) || p.Order.Concentration.Given() || !p.Settled.Concentration.Given() {
		t.Errorf("got %v, settled %q", p.Cautions.Codes(), p.Settled.Concentration.Text)
	}
	// One that can be measured stays neat.
	p = one(t, "syringe", lines(key("drug", "naloxone"), key("dose", "100 microgram"), "dilute_if_needed = true", key("indication", "after surgery")))
	want(t, "neat", p.Mixture.Method.String()+" "+p.Mixture.DrugVolume.Exact(), "neat 0.25")
	// Without leave it is refused, and the refusal carries the same plan.
	_, reasons := plan(t, starter(t), session+child+"[[patient.syringe]]\n"+strings.Replace(body, "dilute_if_needed = true\n", "", 1))
	refused := reasons.Refusals()
	if len(refused) != 1 || refused[0].Code != refusal.VolumeBelowMeasurable || refused[0].Instead == nil {
		t.Fatalf("got %v", reasons)
	}
	in := refused[0].Instead
	want(t, "offered", strings.Join([]string{in.DrugVolume.Exact, in.MeasuringSyringe.Exact, in.FinalVolume.Exact, in.Concentration.Printed, in.DoseVolume.Exact}, " "),
		"0.25 1 1 100 micrograms/mL 0.36")
	want(t, "remedy", refused[0].Remedy, in.Says)
}
