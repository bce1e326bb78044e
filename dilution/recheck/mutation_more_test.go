package recheck

import (
	"slices"
	"testing"
)

// furtherPlans are the complete plans of the tests of doses counted, mixtures for
// one weight, usable time, sizes of container, two steps and two drugs. The
// sources stand beside the builders.
func furtherPlans(t testing.TB) map[string]Stated {
	return map[string]Stated{
		"A121 in two steps":    morphineSteps(t),
		"A073 in two steps":    epoprostenolSteps(t),
		"two steps, moved":     movedSteps(t),
		"two sizes":            packed(t),
		"two drugs":            twoDrugs(t),
		"doses, neat":          neatDoses(t),
		"doses in a volume":    dilutedDoses(t),
		"doses, concentration": dosesOfAConcentration(t),
		"A139, rule of three":  ruleOfThree(t),
		"usable time":          lasting(t),
	}
}

// Every alteration of every figure of them is caught.
func TestFurtherAlterations(t *testing.T) {
	tried := 0
	for what, s := range furtherPlans(t) {
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

// lastFigures are those from which nothing else is worked: a paper may leave them
// off without another figure losing its proof.
var lastFigures = []string{
	Strength, AmountInSyringe, Concentration, LeftVolume, LeftAmount, DrugWanted, DrugMoved, TargetMoved, DoseAmount, IntervalLow, IntervalHigh,
	IntermediateAmount, IntermediateConc, IntermediateLeftVolume, IntermediateLeftAmount,
	OtherStrength, OtherAmount, OtherLeftVolume, OtherLeftAmount, SecondAmount, SecondConcentrated, WantedTime,
}

// Each of them without one of its figures: every figure that is needed for
// another is missed.
func TestFurtherMissingPartners(t *testing.T) {
	lastHere := map[string][]string{
		"A073 in two steps":    {DrugVolume, ContainerCount},
		"two drugs":            {Assay, DrugBarrel, FinalBarrel},
		"A139, rule of three":  {ContainerCount, StartRate},
		"doses, neat":          {DoseWeightBy, DrugStep},
		"doses in a volume":    {DoseWeightBy},
		"doses, concentration": {DoseWeightBy, DoseCount},
		"usable time":          {RunTime},
	}
	for what, s := range furtherPlans(t) {
		for _, f := range s.Figures {
			_, err := Check(s.without(f.Name))
			last := slices.Contains(lastFigures, f.Name) || slices.Contains(lastHere[what], f.Name)
			if (err == nil) != last {
				t.Errorf("%s without %s: got %v, want a fault: %v", what, f.Name, err, !last)
			}
		}
	}
}

// Every name of stated.go that paper may show has a sum, and no other has.
func TestKnows(t *testing.T) {
	for _, name := range []string{DoseCount, Priming, DeadSpace, WantedTime, UsableTime, RuleRate, TakenVolume, TargetMoved, OtherDrug, OtherAmount, Concentration,
		Row(Pack, 1, "presentation"), Row(Pack, 2, "amount"), Row(Pack, 12, "volume"), Row(Pack, 1, "count"), Row(Said, 1, "text"), Row(Code, 2, "text")} {
		if !Knows(name) {
			t.Errorf("%s has no sum", name)
		}
	}
	for _, name := range []string{"", "colour", "pack", "pack.0.count", "pack.01.count", "pack.1.colour", "pack.*.count", "said.*.text", "ladder.rate", FormularyDigest, ProductNumber, Typed, DoseRounding, RateRounding} {
		if Knows(name) {
			t.Errorf("%q has a sum", name)
		}
	}
}
