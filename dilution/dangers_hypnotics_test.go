package dilution_test

import (
	"testing"

	"drawup/dilution/refusal"
)

// Errors met in public pages about hypnotics, opioids and sedatives: figures that
// stand in print and must never be planned.
func TestDangerErrorsInPrint(t *testing.T) {
	run(t, []danger{
		{"alfentanil 40 mg/mL for 40 microgram/mL", "drug monograph copy, alfentanil", "infusion",
			"drug: alfentanil; presentation: ampoule 5 mg in 10 mL; mix: 2000 mg in 50 mL; diluent: glucose 5 %; start: 1 microgram/kg/min; indication: anaesthesia, ventilated",
			refusal.ConcentrationTooHigh, "mix: 25 mg in 50 mL; diluent: -", ""},
		{"lorazepam 2.5 mg for each kg in status epilepticus", "orthopaedic web page, lorazepam", "syringe",
			"drug: lorazepam; presentation: multi-dose vial 40 mg in 10 mL; concentration: 2 mg/mL; volume: 20 mL; diluent: sodium chloride 0.9 %; dose: 2.5 mg/kg; indication: status epilepticus",
			refusal.FormularyBlank, "dose: 4 mg", ""},
		{"lorazepam 0.44 for 0.044 mg/kg", "orthopaedic web page, lorazepam", "syringe",
			"drug: lorazepam; presentation: vial 4 mg in 1 mL; concentration: 2 mg/mL; volume: 2 mL; diluent: sodium chloride 0.9 %; dose: 0.44 mg/kg; indication: sedation before a procedure",
			refusal.SlipTen, "presentation: vial 2 mg in 1 mL; concentration: 1 mg/mL; dose: 0.02 mg/kg", ""},
		{"dexmedetomidine 95 microgram/mL for 100", "machine-rewritten product text, dexmedetomidine", "infusion",
			"drug: dexmedetomidine; presentation: vial 190 microgram in 2 mL; mix: 200 microgram in 50 mL; start: 0.4 microgram/kg/h; indication: sedation in intensive care",
			refusal.PresentationUnknown, "presentation: vial 200 microgram in 2 mL", ""},
		{"dexmedetomidine mg for microgram", "US drug reference page, dexmedetomidine", "infusion",
			"drug: dexmedetomidine; presentation: vial 200 microgram in 2 mL; mix: 200 mg in 50 mL; start: 0.4 mg/kg/h; indication: sedation in intensive care",
			refusal.ConcentrationTooHigh, "mix: 200 microgram in 50 mL; start: 0.4 microgram/kg/h", ""},
		{"hydromorphone 50 mL for 50 mg", "hospital intravenous guide, Ireland, hydromorphone", "syringe",
			"drug: hydromorphone; presentation: ampoule 2 mg in 1 mL; amount: 50 mL; volume: 20 mL",
			refusal.UnitWrongKind, "", ""},
		{"paracetamol 75 for 7.5 mL in an infant", "UK report of a regulator's alert, paracetamol infusion, 2019", "syringe",
			"drug: paracetamol; presentation: vial 1000 mg in 100 mL; dose: 75 mg/kg; indication: pain or fever",
			refusal.SlipTen, "dose: 7.5 mg/kg", infant},
	})
}

// What may never be an infusion, and what must never be given as it comes.
func TestDangerPreparation(t *testing.T) {
	run(t, []danger{
		{"never as infusion: etomidate, propylene glycol", "UK SmPC, etomidate", "infusion",
			"drug: etomidate; presentation: ampoule 20 mg in 10 mL; mix: 20 mg in 10 mL; start: 10 microgram/kg/min", refusal.NeverAsInfusion, "", ""},
		{"never as infusion: etomidate, lipid emulsion", "UK SmPC, etomidate", "infusion",
			"drug: etomidate; presentation: ampoule 20 mg in 10 mL, lipid emulsion; mix: 20 mg in 10 mL; start: 10 microgram/kg/min", refusal.NeverAsInfusion, "", ""},
		{"must be diluted: ketamine 100 mg/mL", "handbook on injectable drugs, 25th edition, ketamine", "syringe",
			"drug: ketamine; presentation: vial 1000 mg in 10 mL; dose: 2 mg/kg; indication: induction", refusal.MustBeDiluted,
			"concentration: 50 mg/mL; volume: 10 mL; diluent: sodium chloride 0.9 %; size: 10 mL", ""},
		{"must be diluted: remifentanil 1 mg/mL", "Hong Kong product text, remifentanil", "infusion",
			"drug: remifentanil; presentation: vial 5 mg; mix: 5 mg in 5 mL; start: 0.1 microgram/kg/min; indication: anaesthesia, ventilated", refusal.MustBeDiluted,
			"mix: 5 mg in 50 mL; diluent: sodium chloride 0.9 %", ""},
		{"must be diluted: dexmedetomidine 100 microgram/mL", "European SmPC, dexmedetomidine", "infusion",
			"drug: dexmedetomidine; presentation: multi-dose vial 1000 microgram in 10 mL; mix: 1000 microgram in 10 mL; start: 0.4 microgram/kg/h; indication: sedation in intensive care", refusal.MustBeDiluted,
			"mix: 400 microgram in 50 mL", ""},
		{"must be diluted: alfentanil 5 mg/mL", "UK SmPC, alfentanil 5 mg/mL", "infusion",
			"drug: alfentanil; presentation: ampoule 5 mg in 1 mL; mix: 5 mg in 1 mL; start: 2 mg/h; indication: intensive care", refusal.MustBeDiluted,
			"mix: 25 mg in 50 mL; diluent: sodium chloride 0.9 %", ""},
		{"must be diluted into a vein: oxycodone 10 mg/mL", "UK SmPC, oxycodone 10 mg/mL", "syringe",
			"drug: oxycodone; presentation: ampoule 10 mg in 1 mL; dose: 5 mg; route: IV", refusal.ConcentrationTooHigh,
			"concentration: 1 mg/mL; volume: 10 mL; diluent: sodium chloride 0.9 %", ""},
		{"must be diluted into a vein: oxycodone 50 mg/mL", "UK leaflet, oxycodone 50 mg/mL", "syringe",
			"drug: oxycodone; presentation: ampoule 50 mg in 1 mL; dose: 5 mg; route: IV", refusal.MustBeDiluted,
			"concentration: 1 mg/mL; volume: 20 mL; diluent: sodium chloride 0.9 %", ""},
		{"must be diluted: lorazepam", "US prescribing information, lorazepam", "syringe",
			"drug: lorazepam; presentation: vial 4 mg in 1 mL; dose: 4 mg; indication: status epilepticus", refusal.MustBeDiluted,
			"concentration: 2 mg/mL; volume: 2 mL; diluent: sodium chloride 0.9 %", ""},
		{"must be diluted: hydromorphone 20 mg/mL", "hospital intravenous guide, Ireland, hydromorphone", "syringe",
			"drug: hydromorphone; presentation: ampoule 20 mg in 1 mL; dose: 1 mg", refusal.MustBeDiluted,
			"concentration: 1 mg/mL; volume: 20 mL; diluent: sodium chloride 0.9 %", ""},
		{"must be diluted: hydromorphone 50 mg/mL", "hospital intravenous guide, Ireland, hydromorphone", "infusion",
			"drug: hydromorphone; presentation: ampoule 50 mg in 1 mL; mix: 50 mg in 1 mL; start: 1 mg/h", refusal.MustBeDiluted,
			"mix: 25 mg in 50 mL; diluent: sodium chloride 0.9 %", ""},
		{"undiluted only: etomidate", "no label gives a diluent; inferred", "syringe",
			"drug: etomidate; presentation: ampoule 20 mg in 10 mL; concentration: 1 mg/mL; volume: 20 mL; diluent: sodium chloride 0.9 %; dose: 14 mg", refusal.DiluentNotListed,
			"concentration: -; volume: -; diluent: -", ""},
		{"undiluted only: propofol 20 mg/mL", "from memory; no label text was seen", "infusion",
			"drug: propofol; presentation: vial 1000 mg in 50 mL; mix: 500 mg in 50 mL; diluent: glucose 5 %; start: 4 mg/kg/h; indication: anaesthesia", refusal.DiluentNotListed,
			"mix: 1000 mg in 50 mL; diluent: -", ""},
		{"undiluted only: a bolus of diazepam", "hospital intravenous guide, Ireland, diazepam solution", "syringe",
			"drug: diazepam; concentration: 1 mg/mL; volume: 10 mL; diluent: sodium chloride 0.9 %; dose: 5 mg; indication: status epilepticus", refusal.ConcentrationTooLow,
			"concentration: -; volume: -; diluent: -", ""},
		{"undiluted only: ketorolac", "machine-written pages quoting US prescribing information, ketorolac", "syringe",
			"drug: ketorolac; concentration: 15 mg/mL; volume: 2 mL; diluent: sodium chloride 0.9 %; dose: 10 mg; route: IV", refusal.DiluentNotListed,
			"concentration: -; volume: -; diluent: -", ""},
		{"forbidden gap: lorazepam 0.5 mg/mL", "US drug monograph on precipitation of lorazepam, as quoted", "syringe",
			"drug: lorazepam; presentation: vial 2 mg in 1 mL; concentration: 0.5 mg/mL; volume: 4 mL; diluent: sodium chloride 0.9 %; dose: 1 mg; indication: sedation before a procedure", refusal.ConcentrationTooLow,
			"concentration: 1 mg/mL; volume: 2 mL", ""},
		{"1 mg/mL from lorazepam 4 mg/mL", "US drug monograph on precipitation of lorazepam, as quoted", "syringe",
			"drug: lorazepam; presentation: vial 4 mg in 1 mL; concentration: 1 mg/mL; volume: 4 mL; diluent: sodium chloride 0.9 %; dose: 2 mg; indication: sedation before a procedure", refusal.ConcentrationTooLow,
			"concentration: 2 mg/mL; volume: 2 mL", ""},
	})
}

// The lowest and highest concentrations into a vein.
func TestDangerConcentrations(t *testing.T) {
	run(t, []danger{
		{"lowest: propofol 2 mg/mL", "Philippine product text, propofol 10 mg/mL", "infusion",
			"drug: propofol; presentation: vial 500 mg in 50 mL; mix: 50 mg in 50 mL; diluent: glucose 5 %; start: 4 mg/kg/h; indication: anaesthesia", refusal.ConcentrationTooLow, "mix: 100 mg in 50 mL", ""},
		{"lowest: remifentanil 20 microgram/mL", "Hong Kong product text, remifentanil", "infusion",
			"drug: remifentanil; presentation: vial 1 mg; mix: 0.5 mg in 50 mL; diluent: sodium chloride 0.9 %; start: 0.1 microgram/kg/min; indication: anaesthesia, ventilated", refusal.ConcentrationTooLow, "mix: 1 mg in 50 mL", ""},
		{"lowest: thiopental 20 mg/mL in water", "Swiss professional information, thiopental", "infusion",
			"drug: thiopental; presentation: vial 500 mg; mix: 500 mg in 50 mL; diluent: water for injections; start: 3 mg/kg/h; indication: intensive care", refusal.ConcentrationTooLow, "diluent: glucose 5 %", ""},
		{"lowest: paracetamol 1 mg/mL", "hospital sheet, intravenous paracetamol", "syringe",
			"drug: paracetamol; presentation: ampoule 100 mg in 10 mL; concentration: 0.5 mg/mL; volume: 50 mL; diluent: glucose 5 %; dose: 25 mg; indication: pain or fever", refusal.ConcentrationTooLow, "", infant},
		{"highest: ketamine 50 mg/mL", "children's hospital parenteral manual, Canada, ketamine", "syringe",
			"drug: ketamine; presentation: vial 1000 mg in 10 mL; concentration: 60 mg/mL; volume: 10 mL; diluent: sodium chloride 0.9 %; dose: 2 mg/kg; indication: induction", refusal.ConcentrationTooHigh, "concentration: 50 mg/mL", ""},
		{"highest: thiopental 25 mg/mL", "Swiss professional information, thiopental", "syringe",
			"drug: thiopental; presentation: vial 500 mg; concentration: 50 mg/mL; volume: 10 mL; diluent: sodium chloride 0.9 %; dose: 250 mg; indication: induction", refusal.ConcentrationTooHigh, "", ""},
		{"highest: methohexital 10 mg/mL", "US drug reference pages, methohexital", "syringe",
			"drug: methohexital; concentration: 20 mg/mL; volume: 10 mL; diluent: sodium chloride 0.9 %; dose: 70 mg; indication: induction", refusal.ConcentrationTooHigh, "", ""},
		{"highest: remifentanil 250 microgram/mL", "Hong Kong product text, remifentanil", "infusion",
			"drug: remifentanil; presentation: vial 5 mg; mix: 20 mg in 50 mL; diluent: sodium chloride 0.9 %; start: 0.5 microgram/kg/min; indication: anaesthesia, ventilated", refusal.ConcentrationTooHigh, "mix: 10 mg in 50 mL", ""},
		{"highest: diazepam solution 0.08 mg/mL", "hospital intravenous guide, Ireland, diazepam solution", "infusion",
			"drug: diazepam; mix: 10 mg in 50 mL; diluent: glucose 5 %; start: 5 mg/kg/day; indication: tetanus", refusal.ConcentrationTooHigh, "mix: 4 mg in 50 mL", ""},
		{"highest: diazepam emulsion 0.4 mg/mL", "hospital intravenous guide, Ireland, diazepam emulsion", "infusion",
			"drug: diazepam emulsion; mix: 40 mg in 50 mL; diluent: glucose 5 %; start: 1 mg/h", refusal.ConcentrationTooHigh, "", ""},
		{"highest: dexmedetomidine 8 microgram/mL", "European SmPC, dexmedetomidine", "infusion",
			"drug: dexmedetomidine; presentation: multi-dose vial 1000 microgram in 10 mL; mix: 500 microgram in 50 mL; start: 0.4 microgram/kg/h; indication: sedation in intensive care", refusal.ConcentrationTooHigh, "mix: 400 microgram in 50 mL", ""},
		{"highest: a bolus of pethidine 10 mg/mL", "handbook on injectable drugs, 25th edition, meperidine", "syringe",
			"drug: pethidine; presentation: ampoule 100 mg in 2 mL; concentration: 25 mg/mL; volume: 4 mL; diluent: sodium chloride 0.9 %; dose: 25 mg; route: IV; indication: pain", refusal.ConcentrationTooHigh, "concentration: 10 mg/mL; volume: 10 mL", ""},
		{"highest: midazolam 0.15 mg/mL in the newborn", "newborn sheet, New Zealand, midazolam, 2019", "infusion",
			"drug: midazolam; presentation: ampoule 5 mg in 5 mL; mix: 25 mg in 50 mL; diluent: glucose 5 %; start: 0.03 mg/kg/h; indication: sedation in intensive care", refusal.ConcentrationTooHigh, "", newborn},
	})
}

// Fluids that break, degrade or precipitate the drug.
func TestDangerDiluents(t *testing.T) {
	run(t, []danger{
		{"diazepam emulsion in sodium chloride", "Acta Anaesthesiol Scand 1981, diazepam emulsion", "infusion",
			"drug: diazepam emulsion; mix: 10 mg in 50 mL; diluent: sodium chloride 0.9 %; start: 1 mg/h", refusal.DiluentForbidden, "", ""},
		{"propofol in sodium chloride", "Philippine product text, propofol 10 mg/mL", "infusion",
			"drug: propofol; presentation: vial 500 mg in 50 mL; mix: 100 mg in 50 mL; diluent: sodium chloride 0.9 %; start: 4 mg/kg/h; indication: anaesthesia", refusal.DiluentForbidden, "diluent: glucose 5 %", ""},
		{"thiopental in compound sodium lactate", "children's hospital parenteral manual, Canada, thiopental", "infusion",
			"drug: thiopental; presentation: vial 500 mg; mix: 500 mg in 50 mL; diluent: compound sodium lactate; start: 3 mg/kg/h; indication: intensive care", refusal.DiluentForbidden, "diluent: glucose 5 %", ""},
		{"methohexital in compound sodium lactate", "handbook on injectable drugs, 25th edition, methohexital", "infusion",
			"drug: methohexital; mix: 100 mg in 50 mL; diluent: compound sodium lactate; start: 4 mg/min; indication: anaesthesia", refusal.DiluentForbidden, "diluent: glucose 5 %", ""},
		{"methohexital in bacteriostatic water", "handbook on injectable drugs, 25th edition, methohexital", "infusion",
			"drug: methohexital; mix: 100 mg in 50 mL; diluent: bacteriostatic water for injections; start: 4 mg/min; indication: anaesthesia", refusal.DiluentForbidden, "diluent: glucose 5 %", ""},
		{"methohexital 2 mg/mL in water", "handbook on injectable drugs, 25th edition, methohexital", "infusion",
			"drug: methohexital; mix: 100 mg in 50 mL; diluent: water for injections; start: 4 mg/min; indication: anaesthesia", refusal.ConcentrationTooLow, "diluent: sodium chloride 0.9 %", ""},
		{"remimazolam in compound sodium lactate", "Hofmann and others, BMC Anesthesiol 2024;24:233", "infusion",
			"drug: remimazolam; mix: 25 mg in 50 mL; diluent: compound sodium lactate; start: 1 mg/kg/h; indication: anaesthesia, maintenance", refusal.DiluentForbidden, "mix: 50 mg in 50 mL; diluent: -", ""},
		{"remimazolam in Ringer acetate", "Hofmann and others, BMC Anesthesiol 2024;24:233", "infusion",
			"drug: remimazolam; mix: 25 mg in 50 mL; diluent: Ringer acetate; start: 1 mg/kg/h; indication: anaesthesia, maintenance", refusal.DiluentForbidden, "mix: 50 mg in 50 mL; diluent: -", ""},
		{"remifentanil in compound sodium lactate", "Czech SmPC, remifentanil, section 6", "infusion",
			"drug: remifentanil; presentation: vial 5 mg; mix: 5 mg in 50 mL; diluent: compound sodium lactate; start: 0.1 microgram/kg/min; indication: anaesthesia, ventilated", refusal.DiluentForbidden, "diluent: sodium chloride 0.9 %", ""},
		{"remifentanil in bicarbonate", "Henkel and others, BMC Anesthesiol 2020;20:283", "infusion",
			"drug: remifentanil; presentation: vial 5 mg; mix: 5 mg in 50 mL; diluent: sodium bicarbonate; start: 0.1 microgram/kg/min; indication: anaesthesia, ventilated", refusal.DiluentNotListed, "diluent: sodium chloride 0.9 %", ""},
		{"midazolam in bicarbonate", "Czech SmPC, midazolam, section 6", "infusion",
			"drug: midazolam; presentation: ampoule 50 mg in 10 mL; mix: 50 mg in 50 mL; diluent: sodium bicarbonate; start: 0.05 mg/kg/h; indication: sedation in intensive care", refusal.DiluentNotListed, "diluent: sodium chloride 0.9 %", ""},
		{"naloxone in bicarbonate", "garbled copy of a UK SmPC, naloxone", "syringe",
			"drug: naloxone; concentration: 40 microgram/mL; volume: 10 mL; diluent: sodium bicarbonate; dose: 100 microgram; indication: after surgery", refusal.DiluentNotListed, "diluent: sodium chloride 0.9 %; dose: 120 microgram", ""},
	})
}

// Doses and rates that a text says not to exceed.
func TestDangerMaxima(t *testing.T) {
	run(t, []danger{
		{"propofol above 4 mg/kg/h in intensive care", "hospital intravenous guide, Ireland, propofol 1 %", "infusion",
			"drug: propofol; presentation: vial 500 mg in 50 mL; mix: 500 mg in 50 mL; start: 4.1 mg/kg/h; indication: sedation in intensive care", refusal.RateAboveHard, "start: 4 mg/kg/h", ""},
		{"dexmedetomidine above 1.4 microgram/kg/h", "European SmPC, dexmedetomidine", "infusion",
			"drug: dexmedetomidine; presentation: vial 200 microgram in 2 mL; mix: 200 microgram in 50 mL; start: 1.5 microgram/kg/h; indication: sedation in intensive care; accepted_by: A. Example; accepted_reason: invented", refusal.RateAboveHard, "start: 1.4 microgram/kg/h", ""},
		{"etomidate above 60 mg in all", "UK drug monograph, etomidate", "syringe",
			"drug: etomidate; presentation: ampoule 20 mg in 10 mL; dose: 0.6 mg/kg; indication: induction", refusal.DoseAboveTotal, "dose: 0.3 mg/kg",
			"\n[[patient]]\nid = \"A\"\nsex = \"male\"\nage = \"40 years\"\nheight = \"200 cm\"\nweight = \"230 kg\"\n"},
		{"thiopental above 500 mg", "hospital intravenous guide, Ireland, thiopental", "syringe",
			"drug: thiopental; presentation: vial 1000 mg; dose: 6 mg/kg actual; indication: induction", refusal.DoseAboveTotal, "dose: 4 mg/kg actual",
			"\n[[patient]]\nid = \"A\"\nsex = \"male\"\nage = \"40 years\"\nheight = \"200 cm\"\nweight = \"110 kg\"\n"},
		{"thiopental above 250 mg at delivery", "hospital intravenous guide, Ireland, thiopental", "syringe",
			"drug: thiopental; presentation: vial 500 mg; dose: 5 mg/kg actual; indication: induction in pregnancy or at delivery", refusal.DoseAboveTotal, "", ""},
		{"flumazenil above 1 mg in anaesthesia", "Malaysian product text, flumazenil", "syringe",
			"drug: flumazenil; presentation: ampoule 1 mg in 10 mL; dose: 1.2 mg; indication: reversal after anaesthesia", refusal.SlipTen, "dose: 0.2 mg", ""},
		{"flumazenil above 2 mg in intensive care", "Malaysian product text, flumazenil", "syringe",
			"drug: flumazenil; presentation: ampoule 1 mg in 10 mL; dose: 2.2 mg; indication: reversal in intensive care", refusal.SlipTen, "dose: 0.3 mg", ""},
		{"ketamine above 1.5 mg/kg/h in children", "children's hospital parenteral manual, Canada, ketamine", "infusion",
			"drug: ketamine; presentation: ampoule 500 mg in 10 mL; mix: 50 mg in 50 mL; diluent: sodium chloride 0.9 %; start: 1.6 mg/kg/h; indication: analgesia; accepted_by: A. Example; accepted_reason: invented", refusal.RateAboveHard, "start: 1.5 mg/kg/h", child},
		{"paracetamol above 1 g", "Irish SmPC, paracetamol 10 mg/mL", "syringe",
			"drug: paracetamol; presentation: vial 1000 mg in 100 mL; dose: 1.1 g; indication: pain or fever, over 50 kg", refusal.DoseAboveHard, "", ""},
	})
}

// Per minute for per hour, per day for per hour, microgram for milligram: the same
// drug is given in all of them.
func TestDangerUnitsOfRates(t *testing.T) {
	icu := "drug: fentanyl; presentation: vial 2500 microgram in 50 mL; standard: 2500 microgram in 50 mL; indication: intensive care; start: "
	list := []danger{
		{"fentanyl per minute for per hour", "secondary pages quoting an intensive-care guideline", "infusion", icu + "2 microgram/kg/min", refusal.SlipTen, "start: 2 microgram/kg/h", ""},
		{"fentanyl per hour for per minute", "UK SmPC, fentanyl", "infusion", icu + "0.05 microgram/kg/h; indication: anaesthesia, ventilated", refusal.SlipTen, "start: 0.05 microgram/kg/min", ""},
		{"remifentanil per hour for per minute", "from memory: guidelines in microgram/kg/h", "infusion",
			"drug: remifentanil; presentation: vial 5 mg; standard: 5 mg in 50 mL; indication: anaesthesia, ventilated; start: 6 microgram/kg/min", refusal.RateAboveHard, "start: 6 microgram/kg/h", ""},
		{"alfentanil mg/h as microgram/kg/min", "UK SmPC, alfentanil 5 mg/mL", "infusion",
			"drug: alfentanil; presentation: ampoule 5 mg in 1 mL; standard: 25 mg in 50 mL; indication: anaesthesia, ventilated; start: 2 microgram/kg/min", refusal.FormularyBlank, "start: 1 microgram/kg/min", ""},
		{"midazolam per minute for per hour", "German SmPC, midazolam", "infusion",
			"drug: midazolam; presentation: vial 50 mg in 50 mL; standard: 50 mg in 50 mL; diluent: -; indication: sedation in intensive care; start: 0.1 mg/kg/min", refusal.RateAboveHard, "presentation: ampoule 50 mg in 10 mL; start: 0.1 mg/kg/h", ""},
		{"ketamine mg/kg/h as microgram/kg/min", "intensive-care drug crib sheet", "infusion",
			"drug: ketamine; presentation: ampoule 500 mg in 10 mL; mix: 50 mg in 50 mL; diluent: sodium chloride 0.9 %; indication: analgesia; start: 0.3 microgram/kg/min", refusal.SlipTen, "start: 5 microgram/kg/min", ""},
		{"propofol microgram/kg/min as mg/kg/h", "US teaching page, propofol", "infusion",
			"drug: propofol; presentation: vial 500 mg in 50 mL; mix: 500 mg in 50 mL; indication: anaesthesia; start: 100 mg/kg/h", refusal.SlipTen, "start: 100 microgram/kg/min", ""},
		{"diazepam per day for per hour", "hospital intravenous guide, Ireland, diazepam solution", "infusion",
			"drug: diazepam; mix: 4 mg in 50 mL; diluent: glucose 5 %; indication: tetanus; start: 3 mg/kg/h", refusal.SlipTen, "start: 3 mg/kg/day", ""},
		{"oxycodone per day for per hour under the skin", "UK SmPC, oxycodone 10 mg/mL", "infusion",
			"drug: oxycodone; presentation: ampoule 20 mg in 2 mL; mix: 20 mg in 20 mL; diluent: sodium chloride 0.9 %; route: SC; indication: pain; start: 7.5 mg/h", refusal.FormularyBlank, "start: 7.5 mg/day", ""},
	}
	run(t, list)
}

// One drug in strengths that are taken for each other: the order must name the
// container that is in the hand.
func TestDangerStrengths(t *testing.T) {
	var list []danger
	for _, c := range [][2]string{
		{"alfentanil 0.5 and 5 mg/mL", "infusion|drug: alfentanil; mix: 25 mg in 50 mL; start: 2 mg/h; indication: intensive care"},
		{"sufentanil 5 and 50 microgram/mL", "syringe|drug: sufentanil; dose: 10 microgram"},
		{"dexmedetomidine 4 and 100 microgram/mL", "infusion|drug: dexmedetomidine; mix: 200 microgram in 50 mL; start: 0.4 microgram/kg/h"},
		{"hydromorphone 2, 20 and 50 mg/mL", "syringe|drug: hydromorphone; dose: 1 mg"},
		{"oxycodone 10 and 50 mg/mL", "syringe|drug: oxycodone; concentration: 1 mg/mL; volume: 10 mL; dose: 5 mg"},
		{"morphine 1, 10, 30 and 60 mg/mL", "infusion|drug: morphine; mix: 50 mg in 50 mL; start: 1 mg/h"},
		{"midazolam 1 and 5 mg/mL", "syringe|drug: midazolam; dose: 2 mg; indication: conscious sedation"},
		{"propofol 10 and 20 mg/mL", "infusion|drug: propofol; mix: 500 mg in 50 mL; start: 4 mg/kg/h; indication: anaesthesia"},
		{"ketamine 10, 50 and 100 mg/mL", "syringe|drug: ketamine; dose: 1 mg/kg; indication: induction"},
		{"esketamine 5 and 25 mg/mL", "syringe|drug: esketamine; dose: 0.5 mg/kg; indication: induction"},
		{"pethidine 5 to 100 mg/mL", "syringe|drug: pethidine; dose: 25 mg; route: IM"},
		{"lorazepam 2 and 4 mg/mL", "syringe|drug: lorazepam; dose: 2 mg; indication: sedation before a procedure"},
		{"clonidine 100, 150 and 500 microgram/mL", "infusion|drug: clonidine; mix: 1000 microgram in 10 mL; route: epidural; start: 30 microgram/h"},
	} {
		list = append(list, splitDanger(c))
	}
	run(t, list)
}

func splitDanger(c [2]string) danger {
	for _, table := range []string{"infusion", "syringe"} {
		if n := len(table); len(c[1]) > n && c[1][:n] == table {
			return danger{c[0], "product texts of either strength, see the formulary", table, c[1][n+1:], refusal.PresentationUnclear, "", ""}
		}
	}
	return danger{item: c[0]}
}
