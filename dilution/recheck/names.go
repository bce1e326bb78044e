package recheck

import (
	"strconv"
	"strings"
)

// Row is the name of a figure in a table: Row(Ladder, 3, "rate") is
// "ladder.3.rate". Rows count from 1.
func Row(table string, row int, column string) string {
	return table + "." + strconv.Itoa(row) + "." + column
}

// splitRow takes a row number out of a name: "ladder.3.rate" gives
// "ladder.*.rate" and 3. Other names come back as they are.
func splitRow(name string) (string, int) {
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
	case Ladder, Slip, Said, Bound, Code:
		return true
	}
	return false
}

func isSlipKind(name string) bool {
	key, _ := splitRow(name)
	return key == Slip+".*.kind"
}

// allRules binds every name to its sum. A name that is missing here cannot be
// printed.
func allRules() map[string]rule {
	return map[string]rule{
		ContainerAmount: measured(containerAmount), ContainerVolume: measured(containerVolume), ContainerCount: containerCount,
		Strength: measured(strength), PowderAdded: measured(powderAdded), PowderDisplaced: measured(powderDisplaced),

		Method: method, DrugVolume: measured(drugVolume), DrugStep: measured(drugStep),
		DiluentVolume: measured(diluentVolume), FinalVolume: measured(finalVolume),
		AmountInSyringe: measured(amountInSyringe), Concentration: measured(concentration),
		LeftVolume: measured(leftVolume), LeftAmount: measured(leftAmount),
		SecondContainer: measured(secondContainer), SecondAmount: measured(secondAmount), SecondConcentrated: measured(secondConcentration),
		SubstanceFactor: measured(substanceFactor), SubstanceAmount: measured(substanceAmount), SubstanceConc: measured(substanceConcentration),

		Assay: measured(assay), DrugBarrel: measured(drugBarrel), FinalBarrel: measured(finalBarrel),
		IntervalPercent: measured(intervalPercent), IntervalLow: measured(intervalLow), IntervalHigh: measured(intervalHigh),

		WeightActual: asTyped(WeightActual), Height: asTyped(Height), Age: age, Sex: sex,
		WeightIdeal: measured(weightIdeal), WeightAdjusted: measured(weightAdjusted), WeightLean: measured(weightLean),
		WeightJames: measured(weightJames), SurfaceArea: measured(surfaceArea), BMI: bodyMassIndex,

		Dose: asTyped(Dose), DoseWeightBy: doseWeightBy, DoseWeight: measured(doseWeight), DoseAmount: measured(doseAmount),
		DoseVolume: measured(doseVolume), DoseStep: stocked(DoseStep), DoseDelivered: measured(doseDelivered),

		RateWeightBy: rateWeightBy, RateWeight: measured(rateWeight), RateStep: asTyped(RateStep),
		StartDose: asTyped(StartDose), StartRate: measured(startRate), StartDelivered: measured(startDelivered),
		LowDose: asTyped(LowDose), LowRate: rateOf(LowDose, upward), HighDose: asTyped(HighDose), HighRate: rateOf(HighDose, downward),
		LimitDose: asTyped(LimitDose), LimitRate: rateOf(LimitDose, downward),
		RunTime: runTime, EmptyAt: emptyAt, EmptyOffset: emptyOffset,

		Ladder + ".*.dose": measured(ladderDose), Ladder + ".*.rate": measured(ladderRate), Ladder + ".*.delivered": measured(ladderDelivered),
		Slip + ".*.kind": slipKind, Slip + ".*.rate": measured(slipRate),

		Prepared: prepared, PreparedOffset: preparedOffset, UseHours: useHours, UseBy: useBy, UseByOffset: useByOffset,
		Code + ".*.text": code, ATC: atc, Serial: serial, Ref: ref, FormularyDigest: typedOnly,
		ProductNumber: typedOnly, ProductDrug: typedOnly, ProductConcentration: typedOnly, ProductVolume: typedOnly, Typed: typedOnly, DoseRounding: typedOnly, RateRounding: typedOnly, Stock: stock,

		DrugWanted: measured(drugWanted), DrugMoved: drugMoved, DoseWanted: measured(doseWanted), DoseMoved: doseMoved,
		StartFlow: measured(startFlow), StartMoved: startMoved,
		IdealFull: measured(idealFull), AdjustedFull: measured(adjustedFull), LeanFull: measured(leanFull),

		Said + ".*.text": said, Bound + ".*.text": bound,
	}
}
