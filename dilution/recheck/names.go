package recheck

import (
	"maps"
	"strconv"
	"strings"
)

// Row is the name of a figure in a table: Row(Ladder, 3, "rate") is
// "ladder.3.rate". Rows count from 1.
func Row(table string, row int, column string) string {
	return table + "." + strconv.Itoa(row) + "." + column
}

// splitRow takes a row number out of a name: "ladder.3.rate" gives
// "ladder.*.rate" and 3. Other names come back as they are, one with a star in it
// empty.
func splitRow(name string) (string, int) {
	if strings.Contains(name, "*") { // no figure has such a name
		return "", 0
	}
	parts := strings.Split(name, ".")
	if len(parts) != 3 || !isTable(parts[0]) {
		return name, 0
	}
	row, err := strconv.Atoi(parts[1])
	if err != nil || row < 1 || strconv.Itoa(row) != parts[1] {
		return name, 0
	}
	return parts[0] + ".*." + parts[2], row
}

func isTable(word string) bool {
	switch word {
	case Ladder, Slip, Said, Bound, Code, Pack:
		return true
	}
	return false
}

// Knows says whether a figure of this name can be printed: whether there is a sum,
// a line of the record or a typed text that confirms it.
func Knows(name string) bool {
	key, _ := splitRow(name)
	_, ok := rules[key]
	return ok && !isTypedOnly(key)
}

// isTypedOnly is true of names that stand in Asked and never on paper.
func isTypedOnly(name string) bool {
	switch name {
	case FormularyDigest, ProductNumber, ProductDrug, ProductConcentration, ProductVolume, Typed, DoseRounding, RateRounding:
		return true
	}
	return false
}

// rules is the table of allRules, made once and never changed.
var rules = allRules()

// allRules binds every name to its sum. A name that is missing here cannot be
// printed.
func allRules() map[string]rule {
	all := map[string]rule{}
	for _, part := range []map[string]rule{
		containerRules(), mixtureRules(), intermediateRules(), otherRules(), intervalRules(),
		patientRules(), doseRules(), infusionRules(), paperRules(),
	} {
		maps.Copy(all, part)
	}
	return all
}

func containerRules() map[string]rule {
	return map[string]rule{
		ContainerAmount: measured(containerAmount), ContainerVolume: measured(containerVolume), ContainerCount: containerCount,
		Strength: measured(strength), PowderAdded: measured(powderAdded), PowderDisplaced: measured(powderDisplaced),
		LeftVolume: measured(leftVolume), LeftAmount: measured(leftAmount),
		SecondContainer: measured(secondContainer), SubstanceFactor: measured(substanceFactor),

		Pack + ".*.presentation": packPresentation, Pack + ".*.amount": measured(packAmount),
		Pack + ".*.volume": measured(packVolume), Pack + ".*.count": packCount,
	}
}

func mixtureRules() map[string]rule {
	return map[string]rule{
		Method: method, DrugVolume: measured(drugVolume), DrugStep: stepOf(DrugStep),
		DrugWanted: measured(drugWanted), DrugMoved: drugMoved, TargetMoved: targetMoved,
		DiluentVolume: measured(diluentVolume), FinalVolume: measured(finalVolume),
		AmountInSyringe: measured(amountInSyringe), Concentration: measured(concentration),
		SecondAmount: measured(secondAmount), SecondConcentrated: measured(secondConcentration),
		SubstanceAmount: measured(substanceAmount), SubstanceConc: measured(substanceConcentration),
	}
}

func intermediateRules() map[string]rule {
	return map[string]rule{
		IntermediateDrugVolume: measured(intermediateDrugVolume), IntermediateDrugStep: stepOf(IntermediateDrugStep),
		IntermediateDrugBarrel: barrelOf(IntermediateDrugBarrel),
		IntermediateVolume:     measured(intermediateVolume), IntermediateStep: stepOf(IntermediateStep), IntermediateBarrel: barrelOf(IntermediateBarrel),
		IntermediateDiluent: measured(intermediateDiluent), IntermediateAmount: measured(intermediateAmount), IntermediateConc: measured(intermediateConcentration),
		IntermediateUseHours: useHours(IntermediateUseHours, IntermediateUseBy), IntermediateUseBy: useBy(IntermediateUseHours, IntermediateUseBy, IntermediateUseByOffset),
		IntermediateUseByOffset: offsetOf(IntermediateUseByOffset, IntermediateUseBy),
		TakenVolume:             measured(takenVolume), TakenStep: stepOf(TakenStep), TakenBarrel: barrelOf(TakenBarrel),
		IntermediateLeftVolume: measured(intermediateLeftVolume), IntermediateLeftAmount: measured(intermediateLeftAmount),
	}
}

func otherRules() map[string]rule {
	return map[string]rule{
		OtherDrug: otherDrug, OtherContainerAmount: measured(otherContainerAmount), OtherContainerVolume: measured(otherContainerVolume),
		OtherContainerCount: otherContainerCount, OtherStrength: measured(otherStrength),
		OtherVolume: measured(otherVolume), OtherStep: stepOf(OtherStep), OtherBarrel: barrelOf(OtherBarrel), OtherAmount: measured(otherAmount),
		OtherLeftVolume: measured(otherLeftVolume), OtherLeftAmount: measured(otherLeftAmount),
	}
}

func intervalRules() map[string]rule {
	return map[string]rule{
		Assay: measured(assay), DrugBarrel: barrelOf(DrugBarrel), FinalBarrel: barrelOf(FinalBarrel),
		IntervalPercent: measured(intervalPercent), IntervalLow: measured(intervalLow), IntervalHigh: measured(intervalHigh),
	}
}

func patientRules() map[string]rule {
	return map[string]rule{
		WeightActual: asTyped(WeightActual), Height: asTyped(Height), Age: age, Sex: sex,
		WeightIdeal: measured(weightIdeal), WeightAdjusted: measured(weightAdjusted), WeightLean: measured(weightLean),
		WeightJames: measured(weightJames), SurfaceArea: measured(surfaceArea), BMI: bodyMassIndex,
		IdealFull: measured(idealFull), AdjustedFull: measured(adjustedFull), LeanFull: measured(leanFull),
	}
}

func doseRules() map[string]rule {
	return map[string]rule{
		Dose: asTyped(Dose), DoseWeightBy: doseWeightBy, DoseWeight: measured(doseWeight), DoseAmount: measured(doseAmount),
		DoseVolume: measured(doseVolume), DoseStep: stocked(DoseStep), DoseDelivered: measured(doseDelivered),
		DoseWanted: measured(doseWanted), DoseMoved: doseMoved, DoseCount: doseCount,
	}
}

func infusionRules() map[string]rule {
	return map[string]rule{
		RateWeightBy: rateWeightBy, RateWeight: measured(rateWeight), RateStep: asTyped(RateStep),
		StartDose: asTyped(StartDose), StartRate: measured(startRate), StartDelivered: measured(startDelivered),
		StartFlow: measured(startFlow), StartMoved: startMoved,
		LowDose: asTyped(LowDose), LowRate: rateOf(LowDose, upward), HighDose: asTyped(HighDose), HighRate: rateOf(HighDose, downward),
		LimitDose: asTyped(LimitDose), LimitRate: rateOf(LimitDose, downward), RuleRate: measured(ruleRate),
		RunTime: runTime, EmptyAt: emptyAt, EmptyOffset: offsetOf(EmptyOffset, EmptyAt),
		Priming: asTyped(Priming), DeadSpace: asTyped(DeadSpace), UsableTime: usableTime, WantedTime: wantedTime,

		Ladder + ".*.dose": measured(ladderDose), Ladder + ".*.rate": measured(ladderRate), Ladder + ".*.delivered": measured(ladderDelivered),
		Slip + ".*.kind": slipKind, Slip + ".*.rate": measured(slipRate),
	}
}

func paperRules() map[string]rule {
	return map[string]rule{
		Prepared: prepared, PreparedOffset: offsetOf(PreparedOffset, UseBy, IntermediateUseBy),
		UseHours: useHours(UseHours, UseBy), UseBy: useBy(UseHours, UseBy, UseByOffset), UseByOffset: offsetOf(UseByOffset, UseBy),
		Code + ".*.text": code, ATC: atc, Serial: serial, Ref: ref, Stock: stock,
		Said + ".*.text": said, Bound + ".*.text": bound,

		FormularyDigest: typedOnly, ProductNumber: typedOnly, ProductDrug: typedOnly, ProductConcentration: typedOnly,
		ProductVolume: typedOnly, Typed: typedOnly, DoseRounding: typedOnly, RateRounding: typedOnly,
	}
}
