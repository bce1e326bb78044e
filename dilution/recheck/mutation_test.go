package recheck

import (
	"strings"
	"testing"
)

// alterEvery alters every figure of s, on all its papers at once (the harder
// case: no paper contradicts another), and returns how many alterations were
// tried and those that passed, as "name: old -> new".
func alterEvery(t *testing.T, s Stated) (int, []string) {
	t.Helper()
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
const plans = 2

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

// A ladder row whose dose the order does not name may be altered within its
// rounding: the row then still says a true thing. Nothing else passes.
func TestUntypedLadder(t *testing.T) {
	for seed := int64(30); seed <= 30; seed++ {
		s := newTruth(seed)
		var asked []Figure
		for _, f := range s.Asked {
			if !strings.HasPrefix(f.Name, Ladder) {
				asked = append(asked, f)
			}
		}
		s.Asked = asked
		_, passed := alterEvery(t, s)
		for _, change := range passed {
			if sameFigure(change) {
				continue
			}
			if !strings.Contains(change, ".dose: ") || !strings.HasPrefix(change, Ladder) {
				t.Errorf("seed %d: passed: %s", seed, change)
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
		UseBy:           {UseHours, UseByOffset, Code},
		RunTime:         {EmptyAt},
		Serial:          {Code},
		ATC:             {Code},
		Method:          {FinalVolume, IntervalPercent},
		Code:            {Serial, ATC},
	}
	for seed := int64(40); seed < 43; seed++ {
		for name, faults := range needed {
			disagreesAt(t, "without "+name, newTruth(seed).without(name), faults...)
		}
	}
}

// One figure of each of many other plans, altered in every way. Fixed seeds.
func TestRandomAlterations(t *testing.T) {
	for seed := int64(2000); seed < 2080; seed++ {
		s := newTruth(seed)
		f := s.Figures[int(seed*7919)%len(s.Figures)]
		for _, text := range alterations(f.Name, f.Text) {
			if _, err := Check(s.with(f.Name, text)); err == nil && !sameFigure(f.Name+": "+f.Text+" -> "+text) {
				t.Errorf("seed %d: passed: %s: %s -> %s", seed, f.Name, f.Text, text)
			}
		}
	}
}
