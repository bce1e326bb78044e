package recheck

import (
	"fmt"
	"strings"
	"testing"
)

// siteBarrels is the stock of the plans in two steps, no graduation twice; 1 mL in
// 0.01 and 5 mL in 0.2 as read in key SYR-READ, the others invented.
const siteBarrels = `drug.barrel = 1 mL
drug.step = 0.01 mL
drug.barrel = 2 mL
drug.step = 0.1 mL
drug.barrel = 5 mL
drug.step = 0.2 mL
drug.barrel = 10 mL
drug.step = 0.5 mL
`

// morphineSteps is the two-step sum A121 of the worked examples, key BAKER:
// morphine 10 mg/mL diluted to 1 mg/mL, 0.1 mL of that holds 100 micrograms. What
// is around it is invented: 1 mL in 10 mL, made up to 1 mL in the giving syringe.
// Interval by the notes' part g, five readings of five syringes: assay 5 %, 1 mL
// in 2 mL 5 %, 10 mL in 10 mL 4 %, 0.1 mL in 1 mL 17 % (table of part c1), 1 mL in
// 1 mL 5 %: 2 sqrt((25 + 25 + 16 + 289 + 25) / 3) = 22.51 %.
func morphineSteps(t testing.TB) Stated {
	t.Helper()
	return stated(t, "amount = \"10 mg\"\nvolume = \"1 mL\"\nassay = \"5 %\"\n",
		siteBarrels+"method = make up to\namount = 100 micrograms\nfinal.volume = 1 mL\nfinal.barrel = 1 mL",
		`container.amount = 10 mg
container.volume = 1 mL
container.count = 1
strength = 10 mg/mL
method = make up to
intermediate.drug.volume = 1 mL
intermediate.drug.step = 0.1 mL
intermediate.drug.barrel = 2 mL
intermediate.volume = 10 mL
intermediate.step = 0.5 mL
intermediate.barrel = 10 mL
intermediate.diluent.volume = 9 mL
intermediate.amount = 10 mg
intermediate.concentration = 1 mg/mL
intermediate.taken.volume = 0.1 mL
intermediate.taken.step = 0.01 mL
intermediate.taken.barrel = 1 mL
intermediate.left.volume = 9.9 mL
intermediate.left.amount = 9.9 mg
diluent.volume = 0.9 mL
final.volume = 1 mL
final.barrel = 1 mL
amount = 100 micrograms
concentration = 100 micrograms/mL
drug.wanted = 0.01 mL
target.moved = nothing
left.volume = 0 mL
left.amount = 0 mg
assay = 5 %
interval.percent = 22.5 %
interval.low = 77.5 micrograms/mL
interval.high = 122.5 micrograms/mL
prepared = 30 Nov 2026 19:45
prepared.offset = +01:00
use.hours = 12 h
use.by = 01 Dec 2026 07:45
use.by.offset = +01:00
intermediate.use.hours = 1 h
intermediate.use.by = 30 Nov 2026 20:45
intermediate.use.by.offset = +01:00`)
}

// epoprostenolSteps is the sum A073, key LBL-EPO: of 0.5 mg in 5 mL, 3 mL made up
// to 100 mL are 3,000 nanograms/mL. The ampoule of 0.5 mg in 1 mL is invented.
// Interval: 2 sqrt((100 + 25 + 16 + 16 + 16) / 3) = 15.19 %.
func epoprostenolSteps(t testing.TB) Stated {
	t.Helper()
	return stated(t, "amount = \"0.5 mg\"\nvolume = \"1 mL\"\nassay = \"10 %\"\n",
		siteBarrels+"method = make up to\nconcentration = 3000 ng/mL\nfinal.volume = 100 mL\nfinal.barrel = 100 mL",
		`container.amount = 500 micrograms
container.volume = 1 mL
container.count = 1
strength = 500 micrograms/mL
method = make up to
drug.volume = 1 mL
intermediate.drug.volume = 1 mL
intermediate.drug.step = 0.01 mL
intermediate.drug.barrel = 1 mL
intermediate.volume = 5 mL
intermediate.step = 0.2 mL
intermediate.barrel = 5 mL
intermediate.diluent.volume = 4 mL
intermediate.amount = 500 micrograms
intermediate.concentration = 100 micrograms/mL
intermediate.taken.volume = 3 mL
intermediate.taken.step = 0.2 mL
intermediate.taken.barrel = 5 mL
intermediate.left.volume = 2 mL
intermediate.left.amount = 200 micrograms
diluent.volume = 97 mL
final.volume = 100 mL
final.barrel = 100 mL
amount = 300 micrograms
concentration = 3 micrograms/mL
target.moved = nothing
assay = 10 %
interval.percent = 15.2 %
interval.low = 2.544 micrograms/mL
interval.high = 3.456 micrograms/mL`)
}

// movedSteps is invented: 43 micrograms/mL in 10 mL of an intermediate of 1 mg/mL
// want 0.43 mL; on 0.1 mL that is 0.4 mL, 40 micrograms/mL: 3/43 = 6.977 % less.
// Of 6.5 mL of 10 mg/mL that are opened 5.5 mL are left.
func movedSteps(t testing.TB) Stated {
	t.Helper()
	return stated(t, "amount = \"65 mg\"\nvolume = \"6.5 mL\"\n",
		siteBarrels+"method = make up to\nconcentration = 0.043 mg/mL\nfinal.volume = 10 mL",
		`container.amount = 65 mg
container.volume = 6.5 mL
container.count = 1
left.volume = 5.5 mL
left.amount = 55 mg
method = make up to
intermediate.drug.volume = 1 mL
intermediate.drug.step = 0.1 mL
intermediate.drug.barrel = 2 mL
intermediate.volume = 10 mL
intermediate.step = 0.5 mL
intermediate.barrel = 10 mL
intermediate.diluent.volume = 9 mL
intermediate.concentration = 1 mg/mL
intermediate.taken.volume = 0.4 mL
intermediate.taken.step = 0.1 mL
intermediate.taken.barrel = 2 mL
intermediate.left.volume = 9.6 mL
diluent.volume = 9.6 mL
final.volume = 10 mL
amount = 400 micrograms
concentration = 40 micrograms/mL
target.moved = 6.98 % less`)
}

func TestPublishedTwoSteps(t *testing.T) {
	s := morphineSteps(t)
	agrees(t, "A121", s)
	agrees(t, "A073", epoprostenolSteps(t))
	agrees(t, "moved", movedSteps(t))
	disagreesAt(t, "A121 in one step", s.with(IntermediateConc, "10 mg/mL"), IntermediateConc)
	disagreesAt(t, "A073, the second dilution forgotten", epoprostenolSteps(t).with(Concentration, "100 micrograms/mL"), Concentration)
}

// wholeChange makes s consistent at another volume taken, so that only what the
// order wants can tell.
func wholeChange(s Stated, taken, left, diluent, amount, conc, moved string) Stated {
	return s.with(TakenVolume, taken).with(IntermediateLeftVolume, left).with(DiluentVolume, diluent).
		with(AmountInSyringe, amount).with(Concentration, conc).with(TargetMoved, moved)
}

// A plan that is right in itself and wrong for the order is caught: tenfold,
// and two graduations off. The graduation on the other side passes, with what it
// moves: 7/43 = 16.28 %.
func TestTwoStepsKeepToTheOrder(t *testing.T) {
	s := movedSteps(t)
	agrees(t, "one graduation up", wholeChange(s, "0.5 mL", "9.5 mL", "9.5 mL", "500 micrograms", "50 micrograms/mL", "16.3 % more"))
	two := wholeChange(s, "0.3 mL", "9.7 mL", "9.7 mL", "300 micrograms", "30 micrograms/mL", "30.2 % less")
	if d := disagreesAt(t, "two graduations down", two, TakenVolume); len(d.Faults) != 1 {
		t.Errorf("got %v, want one fault", d)
	}
	ten := wholeChange(s, "4 mL", "6 mL", "6 mL", "4 mg", "400 micrograms/mL", "830 % more").with(TakenBarrel, "5 mL").with(TakenStep, "0.2 mL")
	disagreesAt(t, "tenfold", ten, TakenVolume)
	s.Asked = list(t, "order", siteBarrels+"method = make up to\nfinal.volume = 10 mL")
	disagreesAt(t, "nothing asked", s, TakenVolume, TargetMoved)
}

// The order may ask an amount, doses alone, or doses counted in a volume. Invented:
// 0.2 mg twice in 10 mL is 0.4 mg of 1 mg/mL; one dose of 0.4 mg that is the whole
// syringe.
func TestTwoStepsOfDoses(t *testing.T) {
	s := movedSteps(t).without(TargetMoved)
	doses := func(asked, figures string) Stated {
		d := s
		d.Asked = list(t, "order", siteBarrels+"method = make up to\ndose.step = 0.5 mL\n"+asked)
		d.Figures = append(append([]Figure{}, s.Figures...), list(t, "draw-up", figures)...)
		return d
	}
	counted := doses("final.volume = 10 mL\ndose = 200 microgram\ndose.count = 2",
		"dose = 200 micrograms\ndose.weight.by = none\ndose.step = 0.5 mL\ndose.amount = 200 micrograms\ndose.volume = 5 mL\ndose.count = 2\ntarget.moved = nothing")
	agrees(t, "counted", counted)
	disagreesAt(t, "another count", counted.with(DoseCount, "3"), DoseCount, TakenVolume)
	alone := doses("dose = 0.4 mg", "dose = 0.4 mg\ndose.weight.by = none\ndose.step = 0.5 mL\ndose.amount = 400 micrograms\ndose.volume = 10 mL\ntarget.moved = nothing")
	agrees(t, "one dose", alone)
	more := alone.with(FinalVolume, "20 mL").with(DiluentVolume, "19.6 mL").with(Concentration, "20 micrograms/mL").with(DoseVolume, "20 mL")
	agrees(t, "the same dose in more", more)
	disagreesAt(t, "a dose and more in the syringe", more.with(DoseVolume, "10 mL"), TakenVolume, DoseVolume)
}

// A drug of mass that is asked in mmol, in two steps. Invented: 4 mmol/g, 1 g in
// 10 mL; 1 mL in 10 mL is 10 mg/mL or 0.04 mmol/mL; 0.08 mmol are 2 mL of that.
func TestTwoStepsInSubstance(t *testing.T) {
	s := stated(t, "amount = \"1 g\"\nvolume = \"10 mL\"\n", siteBarrels+"method = make up to\namount = 0.08 mmol\nfinal.volume = 20 mL",
		`container.amount = 1 g
container.volume = 10 mL
method = make up to
substance.factor = 4 mmol/g
substance.amount = 80 micromol
substance.concentration = 4 micromol/mL
intermediate.drug.volume = 1 mL
intermediate.drug.step = 0.1 mL
intermediate.drug.barrel = 2 mL
intermediate.volume = 10 mL
intermediate.step = 0.5 mL
intermediate.barrel = 10 mL
intermediate.diluent.volume = 9 mL
intermediate.taken.volume = 2 mL
intermediate.taken.step = 0.1 mL
intermediate.taken.barrel = 2 mL
diluent.volume = 18 mL
final.volume = 20 mL
amount = 20 mg
concentration = 1 mg/mL
target.moved = nothing`)
	s.Record = []byte(strings.Replace(string(s.Record), "[[drug.presentation]]", "substance = \"4 mmol/g\"\n[[drug.presentation]]", 1))
	agrees(t, "mmol", s)
	disagreesAt(t, "no factor", s.without(SubstanceFactor), TakenVolume, TargetMoved)
}

// Calculation notes, part g: "a second 1 in 10 step: 5.97 %" is the five readings
// 5, 5, 4, 5, 4 % of five syringes, so twice that, 11.9 %, is printed. Where the
// drug and the volume taken are read in barrels of one capacity, and the two
// volumes made up to as well, the notes forbid to add them as independent:
// 2 sqrt((25 + 10^2 + 8^2) / 3) = 15.87 %.
func TestTwoStepInterval(t *testing.T) {
	build := func(asked, taken, takenBarrel, final, finalBarrel, percent string) Stated {
		return stated(t, "amount = \"100 mg\"\nvolume = \"10 mL\"\nassay = \"5 %\"\n",
			siteBarrels+fmt.Sprintf("drug.barrel = 3 mL\ndrug.step = 0.1 mL\nfinal.barrel = 10 mL\nfinal.barrel = 20 mL\nmethod = make up to\nfinal.volume = %s\nconcentration = %s", final, asked),
			fmt.Sprintf(`container.amount = 100 mg
container.volume = 10 mL
method = make up to
intermediate.drug.volume = 1 mL
intermediate.drug.step = 0.1 mL
intermediate.drug.barrel = 2 mL
intermediate.volume = 10 mL
intermediate.step = 0.5 mL
intermediate.barrel = 10 mL
intermediate.diluent.volume = 9 mL
intermediate.taken.volume = %s
intermediate.taken.step = 0.1 mL
intermediate.taken.barrel = %s
diluent.volume = %s
final.volume = %s
final.barrel = %s
assay = 5 %%
interval.percent = %s`, taken, takenBarrel, map[string]string{"10 mL": "9 mL", "20 mL": "18.5 mL"}[final], final, finalBarrel, percent))
	}
	five := build("0.075 mg/mL", "1.5 mL", "3 mL", "20 mL", "20 mL", "11.9 %")
	agrees(t, "five syringes", five)
	one := build("0.1 mg/mL", "1 mL", "2 mL", "10 mL", "10 mL", "15.9 %")
	agrees(t, "the same syringes again", one)
	disagreesAt(t, "added as independent", one.with(IntervalPercent, "11.9 %"), IntervalPercent)
	for _, wrong := range []string{"11.8 %", "12 %", "9.4 %", "119 %", "1.19 %", "23 %"} {
		disagreesAt(t, wrong, five.with(IntervalPercent, wrong), IntervalPercent)
	}
	for _, name := range []string{IntermediateDrugBarrel, IntermediateBarrel, TakenBarrel, FinalBarrel, Assay} {
		disagreesAt(t, "without "+name, five.without(name), IntervalPercent)
	}
}

// What a dilution in two steps cannot be, each broken at its own place.
func TestTwoStepsRefused(t *testing.T) {
	s := movedSteps(t)
	for _, r := range []struct{ what, name, text, at string }{
		{"neat", Method, "neat", Method},
		{"added to a bag", Method, "add to", Method},
		{"not diluted", IntermediateVolume, "1 mL", IntermediateDrugVolume},
		{"off its graduation", IntermediateDrugVolume, "1.05 mL", IntermediateDrugVolume},
		{"more than there is", TakenVolume, "10.4 mL", TakenVolume},
		{"graduation of another barrel", TakenStep, "0.2 mL", TakenStep},
		{"barrel of another graduation", TakenBarrel, "5 mL", TakenBarrel},
		{"barrel too small", TakenBarrel, "0.3 mL", TakenBarrel},
		{"a graduation nobody stocks", IntermediateStep, "1 mL", IntermediateStep},
		{"no drug", IntermediateDrugVolume, "0 mL", IntermediateDrugVolume},
		{"nothing taken", TakenVolume, "0 mL", TakenVolume},
	} {
		disagreesAt(t, r.what, s.with(r.name, r.text), r.at)
	}
	moved := s
	moved.Figures = append(append([]Figure{}, s.Figures...), Figure{"draw-up", DrugVolume, "1 mL"}, Figure{"draw-up", DrugMoved, "nothing"})
	disagreesAt(t, "drug.moved of two steps", moved, DrugMoved)
	short := s
	short.Asked = append(list(t, "order", "intermediate.taken.barrel = 2 mL"), s.Asked...)
	disagreesAt(t, "a barrel under its own name, the graduation not", short, TakenBarrel, TakenStep)
	short.Asked = append(list(t, "order", "intermediate.taken.step = 0.1 mL"), short.Asked...)
	agrees(t, "both under their own names", short)
}

// Sentences may name the reading tolerance of every volume that is drawn: 1.5 % of
// 2 mL and 2 % of 0.4 mL are 0.038 mL (ISO 7886-1:1993, table 1).
func TestTwoStepSentences(t *testing.T) {
	s := movedSteps(t)
	s.Figures = append(s.Figures, Figure{"draw-up", Row(Said, 1, "text"), "0.4 mL in the 2 mL barrel may be off by 0.038 mL"})
	agrees(t, "tolerance", s)
	disagreesAt(t, "one digit", s.with(Row(Said, 1, "text"), "0.4 mL in the 2 mL barrel may be off by 0.037 mL"), Row(Said, 1, "text"))
}
