package dilution_test

import (
	"slices"
	"testing"

	"drawup/dilution/refusal"
)

// Ten lessons from reading published data on vasoactive and other drugs.
func TestDangerTenLessons(t *testing.T) {
	run(t, []danger{
		{"2 lost hyphen: 37 mL of calcium chloride 10 %", "UK SmPC, calcium chloride 10 %, a copy", "syringe",
			"drug: calcium chloride; presentation: ampoule 6.8 mmol in 10 mL; dose: 25.16 mmol; indication: low calcium", refusal.DoseAboveHard, "dose: 3.4 mmol", ""},
		{"3 lost micro: pg for microgram", "UK SmPC, dobutamine, a copy", "infusion",
			"drug: dobutamine; presentation: ampoule 250 mg in 20 mL; standard: 250 mg in 50 mL; line: central; start: 5 pg/kg/min", refusal.UnitUnknown, "start: 5 microgram/kg/min", ""},
		{"3 micro sign of another alphabet", "secondary page, hydralazine, with two Thai letters", "infusion",
			"drug: dobutamine; presentation: ampoule 250 mg in 20 mL; standard: 250 mg in 50 mL; line: central; start: 5 ฮผg/kg/min", refusal.UnitUnknown, "start: 5 µg/kg/min", ""},
		{"4 magnesium for mg", "machine-paraphrased product texts", "syringe",
			"drug: metoclopramide; presentation: ampoule 10 mg in 2 mL; route: IV; dose: 10 magnesium", refusal.UnitUnknown, "dose: 10 mg", ""},
		{"5 one in ten", "aid organisation and UK texts, phenobarbital", "syringe",
			"drug: rocuronium; presentation: vial 50 mg in 5 mL; concentration: 1 in 10; volume: 10 mL; diluent: sodium chloride 0.9 %", refusal.RatioStrength, "concentration: 1 mg/mL", ""},
		{"7 dobutamine 250 mg in 5, 20 or 50 mL", "Irish and UK SmPCs, dobutamine", "infusion",
			"drug: dobutamine; standard: 250 mg in 50 mL; line: central; start: 5 microgram/kg/min", refusal.PresentationUnclear, "presentation: ampoule 250 mg in 5 mL", ""},
		{"8 metaraminol syringe into a pump", "UK SmPC, metaraminol 0.5 mg/mL syringe, a copy", "infusion",
			"drug: metaraminol; presentation: syringe 5 mg in 10 mL; mix: 25 mg in 50 mL; start: 5 mg/h", refusal.PresentationNotPump, "presentation: vial 5 mg in 10 mL", ""},
		{"8 phenylephrine syringe into a pump", "Singapore product text, phenylephrine 50 microgram/mL", "infusion",
			"drug: phenylephrine; presentation: syringe 500 microgram in 10 mL (as base); mix: 2.5 mg in 50 mL; start: 25 microgram/min", refusal.PresentationNotPump, "presentation: ampoule 10 mg in 1 mL; mix: 5 mg in 50 mL; diluent: sodium chloride 0.9 %", ""},
		{"8 adenosine for imaging as a bolus", "UK SmPC, adenosine 30 mg in 10 mL", "syringe",
			"drug: adenosine; presentation: vial 30 mg in 10 mL; dose: 3 mg", refusal.PresentationNotPump, "presentation: vial 6 mg in 2 mL", ""},
		{"a ratio that is fatal: adrenaline 1:100", "review of formulations of adrenaline", "syringe",
			"drug: adrenaline; presentation: ampoule 10 mg in 10 mL; concentration: 1:100; volume: 10 mL; diluent: sodium chloride 0.9 %", refusal.ConcentrationTooHigh, "concentration: 1:10000", ""},
	})
}

// Lesson 1: "add to" is not "make up to". 4 mg in 4 mL added to 46 mL are 4 mg in
// 50 mL, 80 micrograms/mL, and not the 87 that a published answer works out.
func TestDangerAddToIsNotMakeUpTo(t *testing.T) {
	p := one(t, "infusion", asked(t, "drug: noradrenaline; presentation: ampoule 4 mg in 4 mL; mix: 4 mg in 46 mL; method: add to; diluent: glucose 5 %; line: central; start: 0.1 microgram/kg/min", ""))
	want(t, "concentration", uk().Concentration(p.Mixture.Concentration), "80 micrograms/mL")
	want(t, "final volume", uk().Volume(p.Mixture.FinalVolume), "50 mL")
	p = one(t, "infusion", asked(t, "drug: nicardipine; presentation: vial 25 mg in 10 mL; mix: 25 mg in 240 mL; method: add to; diluent: glucose 5 %; start: 5 mg/h", ""))
	want(t, "nicardipine", uk().Concentration(p.Mixture.Concentration), "100 micrograms/mL")
}

// Lesson 10: a standard concentration fixes the flow, and a slow one says so: 0.1
// microgram/kg/min for an infant of 3 kg, and the start of glyceryl trinitrate.
func TestDangerSlowFlowSaysSo(t *testing.T) {
	for _, order := range []string{
		"drug: glyceryl trinitrate; presentation: vial 50 mg in 50 mL; mix: 50 mg in 50 mL; start: 10 microgram/min",
		"drug: noradrenaline; presentation: ampoule 8 mg in 8 mL; standard: 16 mg in 50 mL; line: central; start: 0.046 microgram/kg/min",
	} {
		_, reasons := plan(t, starter(t), session+adult+"[[patient.infusion]]\n"+asked(t, order, ""))
		if reasons.Refused() || !slices.Contains(reasons.Cautions().Codes(), refusal.RateSlow) {
			t.Errorf("%s: got %v, want the caution %s", order, reasons.Codes(), refusal.RateSlow)
		}
	}
}

// Hard blocks that the documents on these drugs support.
func TestDangerHardBlocks(t *testing.T) {
	amio := "drug: amiodarone; presentation: ampoule 150 mg in 3 mL; indication: continuation; line: central; start: 37.5 mg/h; "
	run(t, []danger{
		{"amiodarone in sodium chloride", "hospital intravenous guide, Ireland, amiodarone", "infusion", amio + "mix: 300 mg in 50 mL; diluent: sodium chloride 0.9 %", refusal.DiluentForbidden, "diluent: glucose 5 %", ""},
		{"amiodarone below 0.6 mg/mL", "handbook on injectable drugs, 25th edition, amiodarone", "infusion", amio + "mix: 25 mg in 50 mL; diluent: glucose 5 %", refusal.ConcentrationTooLow, "mix: 50 mg in 50 mL", ""},
		{"levosimendan in sodium chloride", "Czech SmPC, levosimendan", "infusion", "drug: levosimendan; mix: 2.5 mg in 50 mL; diluent: sodium chloride 0.9 %; start: 0.1 microgram/kg/min", refusal.DiluentForbidden, "diluent: glucose 5 %", ""},
		{"levosimendan above 0.05 mg/mL", "Czech SmPC, levosimendan", "infusion", "drug: levosimendan; mix: 5 mg in 50 mL; diluent: glucose 5 %; start: 0.1 microgram/kg/min", refusal.ConcentrationTooHigh, "mix: 2.5 mg in 50 mL", ""},
		{"nitroprusside in sodium chloride", "handbook on injectable drugs, 25th edition, nitroprusside", "infusion", "drug: sodium nitroprusside; presentation: vial 50 mg in 2 mL; mix: 10 mg in 50 mL; diluent: sodium chloride 0.9 %; start: 0.5 microgram/kg/min", refusal.DiluentForbidden, "diluent: glucose 5 %", ""},
		{"nitroprusside undiluted", "handbook on injectable drugs, 25th edition, nitroprusside", "infusion", "drug: sodium nitroprusside; presentation: vial 50 mg in 2 mL; mix: 50 mg in 2 mL; start: 0.5 microgram/kg/min", refusal.MustBeDiluted, "mix: 10 mg in 50 mL", ""},
		{"nitroprusside as a bolus", "handbook on injectable drugs, 25th edition, nitroprusside", "syringe", "drug: sodium nitroprusside; presentation: vial 20 mg in 100 mL; dose: 1 mg", refusal.NeverAsBolus, "", ""},
		{"phenytoin in glucose", "aid organisation, essential drugs, phenytoin", "infusion", "drug: phenytoin; mix: 500 mg in 50 mL; diluent: glucose 5 %; start: 25 mg/min", refusal.DiluentForbidden, "diluent: sodium chloride 0.9 %", ""},
		{"phenytoin above 10 mg/mL", "hospital intravenous guide, Ireland, phenytoin", "infusion", "drug: phenytoin; mix: 750 mg in 50 mL; diluent: sodium chloride 0.9 %; start: 25 mg/min", refusal.ConcentrationTooHigh, "mix: 500 mg in 50 mL", ""},
		{"phenytoin above 50 mg/min", "aid organisation, essential drugs, phenytoin", "infusion", "drug: phenytoin; mix: 500 mg in 50 mL; diluent: sodium chloride 0.9 %; start: 55 mg/min", refusal.RateAboveHard, "start: 50 mg/min", ""},
		{"co-amoxiclav in glucose", "Philippine product text, co-amoxiclav", "syringe", "drug: co-amoxiclav; presentation: vial 1200 mg; concentration: 60 mg/mL; volume: 10 mL; diluent: glucose 5 %; dose: 600 mg", refusal.DiluentForbidden, "diluent: -", ""},
		{"nicardipine in compound sodium lactate", "machine-written page quoting US prescribing information, nicardipine", "infusion", "drug: nicardipine; presentation: vial 25 mg in 10 mL; mix: 5 mg in 50 mL; diluent: compound sodium lactate; start: 5 mg/h", refusal.DiluentForbidden, "diluent: glucose 5 %", ""},
		{"nicardipine in bicarbonate", "machine-written page quoting US prescribing information, nicardipine", "infusion", "drug: nicardipine; presentation: vial 25 mg in 10 mL; mix: 5 mg in 50 mL; diluent: sodium bicarbonate; start: 5 mg/h", refusal.DiluentForbidden, "diluent: glucose 5 %", ""},
		{"clevidipine diluted", "handbook on injectable drugs, 25th edition, clevidipine", "infusion", "drug: clevidipine; presentation: vial 25 mg in 50 mL; mix: 12.5 mg in 50 mL; diluent: glucose 5 %; start: 2 mg/h", refusal.DiluentNotListed, "mix: 25 mg in 50 mL; diluent: -", ""},
		{"bicarbonate with adrenaline", "children's hospital parenteral manual, Canada, sodium bicarbonate", "infusion", "drug: adrenaline; presentation: ampoule 1 mg in 1 mL; mix: 4 mg in 50 mL; diluent: sodium bicarbonate; line: central; start: 0.1 microgram/kg/min", refusal.DiluentNotListed, "diluent: glucose 5 %", ""},
		{"bicarbonate with noradrenaline", "children's hospital parenteral manual, Canada, sodium bicarbonate", "infusion", "drug: noradrenaline; presentation: ampoule 4 mg in 4 mL; mix: 4 mg in 50 mL; diluent: sodium bicarbonate; line: central; start: 0.1 microgram/kg/min", refusal.DiluentNotListed, "diluent: glucose 5 %", ""},
		{"bicarbonate with dopamine", "children's hospital parenteral manual, Canada, sodium bicarbonate", "infusion", "drug: dopamine; presentation: ampoule 200 mg in 5 mL; mix: 200 mg in 50 mL; diluent: sodium bicarbonate; line: central; start: 5 microgram/kg/min", refusal.DiluentForbidden, "diluent: glucose 5 %", ""},
		{"bicarbonate with dobutamine", "children's hospital parenteral manual, Canada, sodium bicarbonate", "infusion", "drug: dobutamine; presentation: ampoule 250 mg in 20 mL; mix: 250 mg in 50 mL; diluent: sodium bicarbonate; line: central; start: 5 microgram/kg/min", refusal.DiluentForbidden, "diluent: glucose 5 %", ""},
		{"bicarbonate with calcium chloride", "children's hospital parenteral manual, Canada, sodium bicarbonate", "infusion", "drug: calcium chloride; presentation: ampoule 10 mmol in 10 mL; mix: 10 mmol in 50 mL; diluent: sodium bicarbonate; start: 5 mmol/h", refusal.DiluentNotListed, "diluent: sodium chloride 0.9 %", ""},
		{"bicarbonate with calcium gluconate", "US prescribing information, calcium gluconate", "syringe", "drug: calcium gluconate; presentation: ampoule 1000 mg in 10 mL; concentration: 50 mg/mL; volume: 20 mL; diluent: sodium bicarbonate; dose: 1000 mg; indication: low calcium", refusal.DiluentNotListed, "diluent: sodium chloride 0.9 %", ""},
		{"potassium chloride undiluted", "UK national alert, potassium solutions, 2002", "infusion", "drug: potassium chloride; presentation: ampoule 20 mmol in 10 mL; mix: 20 mmol in 10 mL; line: central; start: 5 mmol/h", refusal.MustBeDiluted, "mix: 20 mmol in 50 mL", ""},
		{"potassium chloride as a bolus", "UK national alert, potassium solutions, 2002", "syringe", "drug: potassium chloride; presentation: ampoule 20 mmol in 10 mL; dose: 10 mmol", refusal.NeverAsBolus, "", ""},
		{"potassium chloride as a diluent", "UK national alert, potassium solutions, 2002", "syringe", "drug: co-amoxiclav; presentation: vial 1200 mg; concentration: 30 mg/mL; volume: 20 mL; diluent: potassium chloride; dose: 600 mg", refusal.DiluentNotListed, "", ""},
		{"potassium chloride above 40 mmol/L into a small vein", "teaching hospital, UK, potassium chloride", "infusion", "drug: potassium chloride; presentation: ampoule 20 mmol in 10 mL; mix: 4 mmol in 50 mL; start: 2 mmol/h", refusal.ConcentrationTooHigh, "mix: 2 mmol in 50 mL; start: 5 mmol/h", ""},
		{"potassium chloride above 20 mmol/h", "teaching hospital, UK, potassium chloride", "infusion", "drug: potassium chloride; presentation: ampoule 20 mmol in 10 mL; mix: 20 mmol in 50 mL; line: central; accepted_by: A. Example; accepted_reason: invented; start: 21 mmol/h", refusal.RateAboveHard, "start: 20 mmol/h", ""},
		{"glyceryl trinitrate 5 mg/mL undiluted", "UK SmPC, glyceryl trinitrate 5 mg/mL", "infusion", "drug: glyceryl trinitrate; presentation: ampoule 50 mg in 10 mL; mix: 50 mg in 10 mL; start: 20 microgram/min", refusal.MustBeDiluted, "mix: 20 mg in 50 mL; diluent: glucose 5 %", ""},
		{"glyceryl trinitrate 1 mg/mL as a bolus", "hospital guideline copy, glyceryl trinitrate bolus", "syringe", "drug: glyceryl trinitrate; presentation: ampoule 5 mg in 5 mL; dose: 100 microgram", refusal.ConcentrationTooHigh, "concentration: 50 microgram/mL; volume: 20 mL; diluent: sodium chloride 0.9 %", ""},
		{"esmolol 250 mg/mL undiluted", "family-practice notebook page, esmolol", "infusion", "drug: esmolol; presentation: ampoule 2.5 g in 10 mL; mix: 2.5 g in 10 mL; start: 100 microgram/kg/min; indication: fast heart rate", refusal.MustBeDiluted, "mix: 500 mg in 50 mL; diluent: glucose 5 %", ""},
		{"salbutamol 1 mg/mL undiluted", "handbook on injectable drugs, 25th edition, albuterol", "infusion", "drug: salbutamol; presentation: ampoule 5 mg in 5 mL; mix: 5 mg in 5 mL; start: 10 microgram/min; indication: severe bronchospasm", refusal.MustBeDiluted, "mix: 10 mg in 50 mL; diluent: sodium chloride 0.9 %", ""},
		{"carboprost into a vein", "UK drug monograph, carboprost", "syringe", "drug: carboprost; dose: 250 microgram; route: IV", refusal.RouteNotListed, "route: IM", ""},
		{"carboprost as an infusion", "UK drug monograph, carboprost", "infusion", "drug: carboprost; mix: 250 microgram in 50 mL; start: 10 microgram/min", refusal.NeverAsInfusion, "", ""},
		{"magnesium sulfate above 20 % into a vein", "UK SmPC, magnesium sulfate 10 %", "syringe", "drug: magnesium sulfate; presentation: ampoule 5 g in 10 mL; dose: 4 g; indication: eclampsia, loading dose", refusal.ConcentrationTooHigh, "concentration: 200 mg/mL; volume: 20 mL; diluent: sodium chloride 0.9 %", ""},
		{"vancomycin above 10 mg/min", "Malaysian product text, vancomycin", "infusion", "drug: vancomycin; presentation: vial 500 mg; mix: 250 mg in 50 mL; diluent: glucose 5 %; start: 11 mg/min", refusal.RateAboveHard, "start: 10 mg/min", ""},
		{"vancomycin as a bolus", "Malaysian product text, vancomycin", "syringe", "drug: vancomycin; presentation: vial 500 mg; dose: 500 mg", refusal.NeverAsBolus, "", ""},
		{"vancomycin above 5 mg/mL", "newborn drug protocol, New Zealand, vancomycin", "infusion", "drug: vancomycin; presentation: vial 500 mg; mix: 500 mg in 50 mL; diluent: glucose 5 %; start: 10 mg/min", refusal.ConcentrationTooHigh, "mix: 250 mg in 50 mL", ""},
		{"insulin in mg", "product text, human insulin", "infusion", "drug: insulin; mix: 50 mg in 50 mL; diluent: sodium chloride 0.9 %; start: 0.1 units/kg/h", refusal.AmountKindDiffer, "mix: 50 units in 50 mL", ""},
		{"insulin in U", "common practice: units in full", "infusion", "drug: insulin; mix: 50 U in 50 mL; diluent: sodium chloride 0.9 %; start: 0.1 units/kg/h", refusal.UnitUnknown, "mix: 50 units in 50 mL", ""},
		{"digoxin in mg", "UK SmPC, digoxin 250 microgram/mL", "syringe", "drug: digoxin; presentation: ampoule 500 microgram in 2 mL; concentration: 50 microgram/mL; volume: 10 mL; diluent: glucose 5 %; dose: 500 mg", refusal.SlipThousand, "dose: 500 microgram", ""},
		{"digoxin undiluted", "hospital intravenous guide, Ireland, digoxin", "syringe", "drug: digoxin; presentation: ampoule 500 microgram in 2 mL; dose: 500 microgram", refusal.MustBeDiluted, "concentration: 50 microgram/mL; volume: 10 mL; diluent: glucose 5 %", ""},
	})
}

// Where two documents disagree the cautious one is planned.
func TestDangerConflictsToTheCautiousSide(t *testing.T) {
	push := "drug: phenylephrine; presentation: ampoule 10 mg in 1 mL; concentration: 100 microgram/mL; volume: 50 mL; diluent: sodium chloride 0.9 %; dose: "
	run(t, []danger{
		{"noradrenaline in sodium chloride alone", "handbook on injectable drugs, 25th edition, norepinephrine", "infusion", "drug: noradrenaline; presentation: ampoule 4 mg in 4 mL; mix: 4 mg in 50 mL; diluent: sodium chloride 0.9 %; line: central; start: 0.1 microgram/kg/min", refusal.DiluentForbidden, "diluent: glucose 5 %", ""},
		{"phenylephrine bolus above 100 microgram", "Singapore product text, phenylephrine 50 microgram/mL", "syringe", "drug: phenylephrine; presentation: syringe 500 microgram in 10 mL (as base); dose: 120 microgram", refusal.DoseAboveHard, "dose: 100 microgram", ""},
		{"phenylephrine bolus of 250 microgram", "US prescribing information, phenylephrine", "syringe", push + "250 microgram", refusal.DoseAboveHard, "volume: 10 mL; presentation: vial 50 mg in 5 mL; concentration: 100 microgram/mL; dose: -", ""},
		{"ephedrine 9 mg in one dose", "UK SmPC, ephedrine 3 mg/mL syringe", "syringe", "drug: ephedrine; presentation: syringe 30 mg in 10 mL; dose: 9 mg", refusal.DoseAboveHard, "dose: 6 mg", ""},
		{"labetalol in sodium chloride", "bedside clinical guideline, UK, labetalol", "infusion", "drug: labetalol; presentation: ampoule 100 mg in 20 mL; mix: 50 mg in 50 mL; diluent: sodium chloride 0.9 %; start: 1 mg/min; indication: lowering of blood pressure", refusal.DiluentNotListed, "diluent: glucose 5 %", ""},
		{"labetalol above 200 mg", "bedside clinical guideline, UK, labetalol", "syringe", "drug: labetalol; presentation: ampoule 100 mg in 20 mL; dose: 205 mg", refusal.FormularyBlank, "dose: 50 mg", ""},
		{"esmolol 250 microgram/kg/min against a fast heart", "Thai product text, esmolol", "infusion", "drug: esmolol; presentation: ampoule 2.5 g in 10 mL; mix: 500 mg in 50 mL; diluent: glucose 5 %; accepted_by: A. Example; accepted_reason: invented; start: 250 microgram/kg/min; indication: fast heart rate", refusal.RateAboveHard, "indication: high blood pressure", ""},
		{"levosimendan load", "intensive-care drug manual, New Zealand, levosimendan", "syringe", "drug: levosimendan; dose: 6 microgram/kg", refusal.NeverAsBolus, "", ""},
		{"adenosine above 12 mg", "US prescribing information, adenosine", "syringe", "drug: adenosine; presentation: vial 12 mg in 4 mL; dose: 12.3 mg", refusal.DoseAboveHard, "presentation: vial 6 mg in 2 mL; dose: 3 mg", ""},
		{"amiodarone above 1200 mg a day", "Slovak SmPC, amiodarone", "infusion", "drug: amiodarone; presentation: ampoule 150 mg in 3 mL; mix: 300 mg in 50 mL; diluent: glucose 5 %; line: central; start: 60 mg/h; indication: continuation", refusal.RateAboveHard, "start: 37.5 mg/h", ""},
		{"insulin in glucose", "US prescribing information, insulin, as quoted", "infusion", "drug: insulin; mix: 50 units in 50 mL; diluent: glucose 5 %; start: 0.1 units/kg/h", refusal.DiluentNotListed, "diluent: sodium chloride 0.9 %", ""},
		{"furosemide in glucose", "nursing page, furosemide", "infusion", "drug: furosemide; presentation: ampoule 50 mg in 5 mL; mix: 50 mg in 50 mL; diluent: glucose 5 %; start: 5 mg/h; indication: fluid overload", refusal.DiluentForbidden, "diluent: sodium chloride 0.9 %", ""},
		{"furosemide above 4 mg/min", "UK product text, furosemide", "infusion", "drug: furosemide; presentation: ampoule 250 mg in 25 mL; mix: 500 mg in 50 mL; start: 4.1 mg/min; indication: kidney failure, high dose", refusal.RateAboveHard, "start: 2.5 mg/min", ""},
		{"phenobarbital above 60 mg/min", "handbook on injectable drugs, 25th edition, phenobarbital", "infusion", "drug: phenobarbital; presentation: ampoule 200 mg in 1 mL; mix: 1000 mg in 50 mL; diluent: sodium chloride 0.9 %; start: 65 mg/min; indication: status epilepticus", refusal.RateAboveHard, "start: 60 mg/min", ""},
		{"phenobarbital above 20 mg/mL", "aid organisation, essential drugs, phenobarbital, 2024", "infusion", "drug: phenobarbital; presentation: ampoule 200 mg in 1 mL; mix: 2000 mg in 50 mL; diluent: sodium chloride 0.9 %; start: 30 mg/min; indication: status epilepticus", refusal.ConcentrationTooHigh, "mix: 1000 mg in 50 mL", ""},
		{"alprostadil started at 100 nanogram/kg/min", "newborn drug sheet, alprostadil, 2016", "infusion", "drug: alprostadil; mix: 250 microgram in 50 mL; diluent: glucose 5 %; start: 100 nanogram/kg/min", refusal.SoftLimitNotSigned, "start: 20 nanogram/kg/min", newborn},
		{"verapamil above 10 mg", "hospital intravenous guide, Ireland, verapamil", "syringe", "drug: verapamil; presentation: vial 10 mg in 4 mL; dose: 11 mg", refusal.DoseAboveHard, "presentation: ampoule 5 mg in 2 mL; dose: 5 mg", ""},
		{"vasopressin above 0.07 units/min in septic shock", "US prescribing information, vasopressin, 2021", "infusion", "drug: vasopressin; presentation: ampoule 20 units in 1 mL; standard: 20 units in 50 mL; accepted_by: A. Example; accepted_reason: invented; start: 0.08 units/min; indication: septic shock", refusal.RateAboveHard, "start: 0.06 units/min", ""},
		{"metaraminol above 5 mg", "UK SmPC, metaraminol 0.5 mg/mL syringe, a copy", "syringe", "drug: metaraminol; presentation: syringe 5 mg in 10 mL; dose: 10 mg", refusal.SlipTen, "dose: 0.5 mg", ""},
		{"oxytocin above 20 milliunits/min", "UK product text, oxytocin", "infusion", "drug: oxytocin; presentation: ampoule 5 units in 1 mL; mix: 5 units in 500 mL; method: withdraw, then add; indication: labour; start: 21 milliunits/min", refusal.RateAboveHard, "start: 20 milliunits/min", ""},
	})
}
