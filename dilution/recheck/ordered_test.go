package recheck

import (
	"fmt"
	"testing"
)

// doses is an invented syringe of several doses of 10 mg/mL.
func doses(t testing.TB, asked, figures string) Stated {
	t.Helper()
	return stated(t, "amount = \"50 mg\"\nvolume = \"5 mL\"\n", "drug.step = 0.1 mL\ndose.step = 0.1 mL\n"+asked,
		"container.amount = 50 mg\ncontainer.volume = 5 mL\ndrug.step = 0.1 mL\ndose.step = 0.1 mL\ndose.weight.by = none\n"+figures)
}

// neatDoses: 4 doses of 5.4 mg are 0.54 mL each, drawn as 0.5 mL: 2 mL in all.
// Exactly 2.16 mL were wanted: 0.16 / 2.16 = 7.407 %.
func neatDoses(t testing.TB) Stated {
	return doses(t, "dose = 5.4 mg\ndose.count = 4", `method = neat
dose = 5.4 mg
dose.amount = 5.4 mg
dose.volume = 0.5 mL
dose.count = 4
drug.volume = 2 mL
drug.wanted = 2.16 mL
drug.moved = 7.41 % less
final.volume = 2 mL
amount = 20 mg
concentration = 10 mg/mL`)
}

// dilutedDoses: 4 doses of 5.4 mg in 10 mL are 21.6 mg, 2.16 mL, drawn as 2.2 mL:
// 0.04 / 2.16 = 1.852 % more; 2.2 mg/mL; a dose is 2.4545 mL, drawn as 2.5 mL.
func dilutedDoses(t testing.TB) Stated {
	return doses(t, "method = make up to\ndose = 5.4 mg\ndose.count = 4\nfinal.volume = 10 mL", `method = make up to
dose = 5.4 mg
dose.amount = 5.4 mg
dose.volume = 2.5 mL
dose.count = 4
drug.volume = 2.2 mL
drug.wanted = 2.16 mL
drug.moved = 1.85 % more
diluent.volume = 7.8 mL
final.volume = 10 mL
amount = 22 mg
concentration = 2.2 mg/mL`)
}

// dosesOfAConcentration: 3 doses of 6 mg at 3 mg/mL are 2 mL each; the syringe of
// 10 mL holds more than the 6 mL that they take.
func dosesOfAConcentration(t testing.TB) Stated {
	return doses(t, "method = make up to\ndose = 6 mg\ndose.count = 3\nconcentration = 3 mg/mL", `method = make up to
dose = 6 mg
dose.amount = 6 mg
dose.volume = 2 mL
dose.count = 3
drug.volume = 3 mL
diluent.volume = 7 mL
final.volume = 10 mL
amount = 30 mg
concentration = 3 mg/mL`)
}

func TestDoseCount(t *testing.T) {
	agrees(t, "neat", neatDoses(t))
	agrees(t, "in a volume", dilutedDoses(t))
	s := dosesOfAConcentration(t)
	agrees(t, "at a concentration", s)
	five := s.with(DoseCount, "5")
	five.Asked = list(t, "order", "drug.step = 0.1 mL\ndose.step = 0.1 mL\nmethod = make up to\ndose = 6 mg\ndose.count = 5\nconcentration = 3 mg/mL")
	agrees(t, "five doses fill it", five)
	five.Asked = append(list(t, "order", "dose.count = 6"), five.Asked[:5]...)
	five.Asked = append(five.Asked, Figure{"order", Concentration, "3 mg/mL"})
	disagreesAt(t, "six were asked", five, DoseCount)
	disagreesAt(t, "six do not fit", five.with(DoseCount, "6"), DoseCount)
	more := neatDoses(t).with(FinalVolume, "2.5 mL").with(DrugVolume, "2.5 mL").with(AmountInSyringe, "25 mg")
	disagreesAt(t, "neat and more than the doses", more, DoseCount, DrugVolume)
	disagreesAt(t, "typed and not printed", neatDoses(t).without(DoseCount), DrugVolume, DrugWanted)
	for _, text := range []string{"0", "4.0", "04", "4 doses", "", "3.5", "-4"} {
		disagreesAt(t, text, neatDoses(t).with(DoseCount, text), DoseCount)
	}
	one := dilutedDoses(t)
	one.Asked = list(t, "order", "drug.step = 0.1 mL\ndose.step = 0.1 mL\nmethod = make up to\ndose = 5.4 mg\nfinal.volume = 10 mL")
	disagreesAt(t, "nobody typed a count", one, DoseCount, DrugVolume)
	whole := dilutedDoses(t).with(DrugVolume, "5 mL")
	whole.Asked = append(whole.Asked, Figure{"order", ContainerCount, "1"})
	whole.Figures = append(whole.Figures, Figure{"draw-up", ContainerCount, "1"})
	whole = whole.with(DiluentVolume, "5 mL").with(AmountInSyringe, "50 mg").with(Concentration, "5 mg/mL").with(DoseVolume, "1.1 mL").with(DrugWanted, "5 mL").with(DrugMoved, "nothing")
	agrees(t, "a whole container, whatever the doses take", whole)
}

// ruleMix is a mixture for one weight.
func ruleMix(t testing.TB, weight, amount, final, diluent, conc, typed, printed, rate string) Stated {
	t.Helper()
	asked := "method = make up to\ndrug.step = 0.2 mL\nrate.step = 0.1 mL/h\nfinal.volume = " + final + "\nweight.actual = " + weight + "\nstart.dose = " + printed
	if typed != "" {
		asked += "\nrule.rate = " + typed
	}
	return stated(t, fmt.Sprintf("amount = %q\nvolume = \"10 mL\"\n", amount), asked, fmt.Sprintf(`container.amount = %s
container.volume = 10 mL
container.count = 1
method = make up to
drug.volume = 10 mL
drug.step = 0.2 mL
drug.wanted = 10 mL
drug.moved = nothing
diluent.volume = %s
final.volume = %s
amount = %s
concentration = %s
weight.actual = %s
rule.rate = %s
rate.weight.by = actual
rate.weight = %s
start.dose = %s
rate.step = 0.1 mL/h
start.rate = %s`, amount, diluent, final, amount, conc, weight, printed, weight, printed, rate))
}

// ruleOfThree is A139 of the worked examples, key RULE3: 50 mL, 5 microgram/kg/min
// for 1 mL/h, 6 kg: 90 mg.
func ruleOfThree(t testing.TB) Stated {
	return ruleMix(t, "6 kg", "90 mg", "50 mL", "40 mL", "1.8 mg/mL", "5 mcg/kg/min", "5 micrograms/kg/min", "1 mL/h")
}

// The rule of six (key ISMP-2005): 6 mg for each kg in 100 mL, 1 mL/h is
// 1 microgram/kg/min; 0.6 mg for each kg, 0.1. The weights are invented. The other
// published example of key RULE3 is 1.8 mg; 3 x 6 x 0.1 gives it.
func TestRulesOfSixAndThree(t *testing.T) {
	three := ruleOfThree(t)
	agrees(t, "A139", three)
	six := ruleMix(t, "10 kg", "60 mg", "100 mL", "90 mL", "600 micrograms/mL", "", "1 micrograms/kg/min", "1 mL/h")
	agrees(t, "rule of six", six)
	agrees(t, "0.6 for each kg", ruleMix(t, "10 kg", "6 mg", "100 mL", "90 mL", "60 micrograms/mL", "0.1 mcg/kg/min", "0.1 micrograms/kg/min", "1 mL/h"))
	agrees(t, "RULE3, 1.8 mg", ruleMix(t, "6 kg", "1.8 mg", "50 mL", "40 mL", "36 micrograms/mL", "0.1 mcg/kg/min", "0.1 micrograms/kg/min", "1 mL/h"))
	disagreesAt(t, "another rate that nobody typed", six.with(RuleRate, "5 micrograms/kg/min"), RuleRate, DrugVolume)
	disagreesAt(t, "another rate than typed", three.with(RuleRate, "1 micrograms/kg/min"), RuleRate)
	disagreesAt(t, "typed and not printed", three.without(RuleRate), DrugVolume)
	ten := ruleMix(t, "6 kg", "900 mg", "50 mL", "40 mL", "18 mg/mL", "5 mcg/kg/min", "5 micrograms/kg/min", "0.1 mL/h")
	if d := disagreesAt(t, "tenfold drug, all else right", ten, DrugVolume); len(d.Faults) != 3 {
		t.Errorf("got %v, want faults at drug.volume, drug.wanted and drug.moved", d)
	}
	hundred := ruleMix(t, "10 kg", "60 mg", "50 mL", "40 mL", "1.2 mg/mL", "", "1 micrograms/kg/min", "0.5 mL/h")
	disagreesAt(t, "the rule of six in 50 mL", hundred, DrugVolume)
}

// The weight of the rule is that of the rate; two that differ cannot both be right.
// A man of 80 kg, 150 cm is 51.6 kg lean (key CLINPK): 3 x 51.6 = 154.8 mg.
func TestRuleByLeanWeight(t *testing.T) {
	s := ruleMix(t, "80 kg", "154.8 mg", "50 mL", "40 mL", "3.096 mg/mL", "1 mcg/kg/min lean", "1 micrograms/kg/min", "1 mL/h")
	s.Figures = append(s.Figures, list(t, "draw-up", "height = 150 cm\nsex = male\nweight.lean = 51.6 kg")...)
	s = s.with(RateWeightBy, "lean").with(RateWeight, "51.6 kg")
	s.Asked = append(s.Asked, list(t, "order", "height = 150 cm\nsex = male")...)
	disagreesAt(t, "the start dose goes by another weight", s, RateWeightBy)
	alone := s.without(StartDose).without(StartRate).without(RateStep)
	agrees(t, "the rule alone", alone)
	disagreesAt(t, "by a weight that was not named", alone.with(RateWeightBy, "actual"), RateWeightBy, RateWeight)
	for i := range s.Asked {
		if s.Asked[i].Name == StartDose {
			s.Asked[i].Text = "1 microgram/kg/min lean"
		}
	}
	agrees(t, "both by the lean weight", s)
}

// lasting is the hospital grid's adrenaline (key CCDI: 2 mg in 50 mL, 70 kg, 0.1
// microgram/kg/min, 10.5 mL/h). By the notes' part a1, usable volume over flow: of
// 50 mL 2 mL fill the line, 0.1 mL stays: 47.9 / 10.5 = 4 h 33.7 min; all 50 mL
// would last 4 h 45.7 min.
func lasting(t testing.TB) Stated {
	s := stated(t, "amount = \"2 mg\"\nvolume = \"10 mL\"\n", `method = make up to
amount = 2 mg
prepared.offset = +01:00
drug.step = 0.2 mL
weight.actual = 70 kg
start.dose = 0.1 micrograms/kg/min
rate.step = 0.1 mL/h
priming = 2 ml
dead.space = 0.10 mL
wanted.time = 4.5 h`, `container.amount = 2 mg
container.volume = 10 mL
method = make up to
drug.volume = 10 mL
drug.step = 0.2 mL
diluent.volume = 40 mL
final.volume = 50 mL
concentration = 40 micrograms/mL
weight.actual = 70 kg
rate.weight.by = actual
rate.weight = 70 kg
start.dose = 0.1 micrograms/kg/min
rate.step = 0.1 mL/h
start.rate = 10.5 mL/h
priming = 2 mL
dead.space = 0.1 mL
run.time = 4 h 45 min
usable.time = 4 h 33 min
wanted.time = 4 h 30 min
prepared = 30 Nov 2026 21:15
prepared.offset = +01:00
empty.at = 01 Dec 2026 01:48`)
	return s
}

func TestUsableTime(t *testing.T) {
	s := lasting(t)
	agrees(t, "less line and dead space", s)
	disagreesAt(t, "line and dead space forgotten", s.with(UsableTime, "4 h 45 min"), UsableTime, EmptyAt)
	disagreesAt(t, "empty as if all were usable", s.with(EmptyAt, "01 Dec 2026 02:00"), EmptyAt)
	disagreesAt(t, "a minute up", s.with(UsableTime, "4 h 34 min"), UsableTime)
	disagreesAt(t, "typed and not printed", s.without(DeadSpace), UsableTime)
	disagreesAt(t, "typed and not printed", s.without(Priming), UsableTime)
	disagreesAt(t, "wanted and nothing to hold it against", s.without(UsableTime), WantedTime)
	asked := func(name, text string) Stated {
		a := s
		a.Asked = append([]Figure{}, s.Asked...)
		for i := range a.Asked {
			if a.Asked[i].Name == name {
				a.Asked[i].Text = text
			}
		}
		return a
	}
	agrees(t, "wanted to the minute", asked(WantedTime, "4 h 33 min").with(WantedTime, "4 h 33 min"))
	disagreesAt(t, "wanted a minute more", asked(WantedTime, "274 min").with(WantedTime, "4 h 34 min"), WantedTime)
	disagreesAt(t, "more was wanted than is printed", asked(WantedTime, "6 h"), WantedTime)
	disagreesAt(t, "another line", asked(Priming, "3 mL"), Priming)
	none := asked(Priming, "50 mL").with(Priming, "50 mL").with(UsableTime, "0 min")
	disagreesAt(t, "nothing left", none, UsableTime)
	bare := s.without(Priming).without(DeadSpace).with(UsableTime, "4 h 45 min").with(EmptyAt, "01 Dec 2026 02:00")
	bare.Asked = s.Asked[:7]
	bare = bare.without(WantedTime)
	agrees(t, "neither line nor dead space", bare)
	unasked := s
	unasked.Asked = s.Asked[:7]
	disagreesAt(t, "nobody typed them", unasked, Priming, DeadSpace, WantedTime)
}
