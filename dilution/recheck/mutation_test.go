package recheck

import (
	"slices"
	"strings"
	"testing"
)

// alterEvery alters every figure of s, on all its papers at once (the harder
// case: no paper contradicts another), and returns how many alterations were
// tried and those that passed, as "name: old -> new". Sentences are taken out
// first, so that every figure is caught by its own sum.
func alterEvery(t *testing.T, s Stated) (int, []string) {
	t.Helper()
	s.Figures = slices.DeleteFunc(slices.Clone(s.Figures), func(f Figure) bool { return isSentence(f.Name) })
	if _, err := Check(s); err != nil {
		t.Fatalf("the unaltered figures: %v", err)
	}
	tried := 0
	var passed []string
	seen := map[string]bool{}
	for _, f := range s.Figures {
		if seen[f.Name] {
			continue
		}
		seen[f.Name] = true
		for _, text := range alterations(f.Name, f.Text) {
			tried++
			if _, err := Check(s.with(f.Name, text)); err == nil {
				passed = append(passed, f.Name+": "+f.Text+" -> "+text)
			}
		}
	}
	return tried, passed
}

// isSentence is true of the rows whose alterations said_test.go tries: of a
// random plan an altered number may by chance be another figure of the plan.
func isSentence(name string) bool {
	return strings.HasPrefix(name, Said+".") || strings.HasPrefix(name, Bound+".")
}

// sameFigure says whether two texts are the same quantity in other words: an
// amount of nothing stays nothing in another unit of its kind.
func sameFigure(change string) bool {
	_, texts, _ := strings.Cut(change, ": ")
	old, now, _ := strings.Cut(texts, " -> ")
	a, err := readPrinted(old)
	b, fault := readPrinted(now)
	return err == nil && fault == nil && a.whole.dim == b.whole.dim && a.whole.against(b.whole) == 0
}

// plans is how many complete plans have every figure altered; some three
// thousand alterations each.
const plans = 1

// Every alteration of every figure of complete plans is caught.
func TestEveryAlterationIsCaught(t *testing.T) {
	tried, same := 0, 0
	for seed := int64(1); seed <= plans; seed++ {
		n, passed := alterEvery(t, newTruth(seed))
		tried += n
		for _, change := range passed {
			if sameFigure(change) {
				same++
				continue
			}
			t.Errorf("seed %d: passed: %s", seed, change)
		}
	}
	t.Logf("%d alterations tried, %d of them the same quantity in another unit, the rest caught", tried, same)
}

// The same for the complete hand-written plans, most of them published sums: the
// sources stand beside the builders.
func TestPublishedAlterations(t *testing.T) {
	plans := map[string]Stated{
		"CCDI adrenaline":     rated(t, "2 mg", "50 mL", "40 mL", "40 micrograms/mL", "70 kg", "0.1 micrograms/kg/min", "0.1 mL/h", "10.5 mL/h"),
		"LBL-CISA tie":        rated(t, "40 mg", "100 mL", "90 mL", "0.4 mg/mL", "45 kg", "3 micrograms/kg/min", "0.1 mL/h", "20.3 mL/h"),
		"LBL-CISA whole":      rated(t, "10 mg", "100 mL", "90 mL", "0.1 mg/mL", "45 kg", "1.5 micrograms/kg/min", "1 mL/h", "41 mL/h"),
		"GAL-NORA":            mixed(t, "4 mg", "50 mL", "40 mL", "80 micrograms/mL", "", ""),
		"DISP amoxicillin":    amoxicillin(t),
		"part g interval":     partG(t, "make up to", "9 mL", "9.4 %", "0.906 mg/mL", "1.094 mg/mL"),
		"clocks go back":      clockChange(t),
		"invented, lean":      leanPlan(t),
		"invented, whole amp": wholeAmpoule(t),
	}
	tried := 0
	for what, s := range plans {
		n, passed := alterEvery(t, s)
		tried += n
		for _, change := range passed {
			if !sameFigure(change) {
				t.Errorf("%s: passed: %s", what, change)
			}
		}
	}
	t.Logf("%d alterations tried", tried)
}

// clockChange is a use-by over the end of summer time (R18).
func clockChange(t *testing.T) Stated {
	return stated(t, "", "", `prepared = 24 Oct 2026 20:00
prepared.offset = +01:00
use.hours = 24 h
use.by = 25 Oct 2026 19:00
use.by.offset = +00:00`)
}

// wholeAmpoule is an invented order for two whole ampoules.
func wholeAmpoule(t *testing.T) Stated {
	return stated(t, "amount = \"5 mg\"\nvolume = \"5 mL\"\n", "container.count = 2\nmethod = make up to\ndrug.step = 0.5 mL", `container.amount = 5 mg
container.volume = 5 mL
container.count = 2
strength = 1 mg/mL
method = make up to
drug.volume = 10 mL
drug.step = 0.5 mL
diluent.volume = 40 mL
final.volume = 50 mL
left.volume = 0 mL
amount = 10 mg
concentration = 200 micrograms/mL`)
}

// leanPlan is an invented infusion by lean weight; the lean weight 51.6 kg (man,
// 80 kg, 150 cm) is the published one of key CLINPK. Worked by hand: 40 microgram/mL;
// 0.1 x 51.6 x 60 / 40 = 7.74 mL/h, printed 7.7; 7.7 x 40 / (60 x 51.6) = 0.09948;
// 50 mL / 7.7 mL/h = 6 h 29.6 min; slips 464.4, 0.129, 77.4, 0.774, 17.0638.
func leanPlan(t *testing.T) Stated {
	return stated(t, "amount = \"2 mg\"\nvolume = \"2 mL\"\n", `method = make up to
amount = 2 mg
final.volume = 50 mL
drug.step = 0.1 mL
weight.actual = 80 kg
height = 150 cm
sex = male
start.dose = 0.1 microgram/kg/min lean
rate.step = 0.1 mL/h`, `container.amount = 2 mg
container.volume = 2 mL
method = make up to
drug.volume = 2 mL
drug.step = 0.1 mL
diluent.volume = 48 mL
final.volume = 50 mL
concentration = 40 micrograms/mL
weight.actual = 80 kg
height = 150 cm
sex = male
weight.lean = 51.6 kg
rate.weight.by = lean
rate.weight = 51.6 kg
rate.step = 0.1 mL/h
start.dose = 0.1 micrograms/kg/min
start.rate = 7.7 mL/h
start.delivered = 0.0995 micrograms/kg/min
run.time = 6 h 29 min
slip.1.kind = per minute for per hour
slip.1.rate = 464.4 mL/h
slip.2.kind = per hour for per minute
slip.2.rate = 0.1 mL/h
slip.3.kind = ten times
slip.3.rate = 77.4 mL/h
slip.4.kind = a tenth
slip.4.rate = 0.8 mL/h
slip.5.kind = pounds for kilograms
slip.5.rate = 17.1 mL/h`)
}

// A ladder row whose dose the order does not name may be altered within its
// rounding: the row then still says a true thing. Nothing else of it passes.
func TestUntypedLadder(t *testing.T) {
	s := newTruth(30)
	s.Asked = slices.DeleteFunc(s.Asked, func(f Figure) bool { return strings.HasPrefix(f.Name, Ladder) })
	for _, f := range s.Figures {
		if !strings.HasPrefix(f.Name, Ladder) {
			continue
		}
		for _, text := range alterations(f.Name, f.Text) {
			_, err := Check(s.with(f.Name, text))
			if err == nil && !strings.HasSuffix(f.Name, ".dose") && !sameFigure(f.Name+": "+f.Text+" -> "+text) {
				t.Errorf("passed: %s: %s -> %s", f.Name, f.Text, text)
			}
		}
	}
}

// One paper altered alone is caught too, and the fault names that paper.
func TestPapersMustAgree(t *testing.T) {
	s := newTruth(3)
	last := len(s.Figures) - 1 // the concentration on another label
	figures := append([]Figure{}, s.Figures...)
	figures[last].Text = "1.23 mg/mL"
	s.Figures = figures
	d := disagreesAt(t, "one paper", s, Concentration)
	if len(d.Faults) != 1 || d.Faults[0].Paper != "another label" {
		t.Errorf("got %v, want one fault on the other label", d)
	}
}

// A figure taken away makes every figure that needs it a fault; nothing is
// assumed in its place.
func TestMissingPartners(t *testing.T) {
	needed := map[string][]string{
		ContainerAmount: {Strength, AmountInSyringe, Concentration, StartRate},
		ContainerVolume: {Strength, AmountInSyringe, Concentration},
		DrugVolume:      {AmountInSyringe, FinalVolume, LeftVolume},
		FinalVolume:     {Concentration, RunTime},
		RateStep:        {StartRate, LowRate, HighRate, LimitRate},
		DoseStep:        {DoseVolume},
		StartDose:       {StartRate, StartDelivered, RateWeightBy},
		Sex:             {WeightIdeal, WeightAdjusted, WeightLean, WeightJames},
		Height:          {WeightIdeal, SurfaceArea, BMI},
		WeightActual:    {WeightLean, BMI},
		Assay:           {IntervalPercent},
		DrugStep:        {DrugVolume},
		Prepared:        {UseBy, EmptyAt},
		PreparedOffset:  {UseBy, EmptyAt},
		UseHours:        {UseBy},
		UseBy:           {UseHours, UseByOffset, "code.1.text", "code.2.text"},
		RunTime:         {EmptyAt},
		Serial:          {"code.1.text", "code.2.text"},
		ATC:             {"code.1.text"},
		Method:          {FinalVolume, IntervalPercent},
		"code.1.text":   {Serial, ATC},
	}
	for seed := int64(40); seed < 43; seed++ {
		for name, faults := range needed {
			disagreesAt(t, "without "+name, newTruth(seed).without(name), faults...)
		}
	}
}

// One figure of each of many other plans, altered in every way. Fixed seeds.
func TestRandomAlterations(t *testing.T) {
	for seed := int64(2000); seed < 2030; seed++ {
		s := newTruth(seed)
		s.Figures = slices.DeleteFunc(s.Figures, func(f Figure) bool { return isSentence(f.Name) })
		f := s.Figures[int(seed*7919)%len(s.Figures)]
		for _, text := range alterations(f.Name, f.Text) {
			if _, err := Check(s.with(f.Name, text)); err == nil && !sameFigure(f.Name+": "+f.Text+" -> "+text) {
				t.Errorf("seed %d: passed: %s: %s -> %s", seed, f.Name, f.Text, text)
			}
		}
	}
}
