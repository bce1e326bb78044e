package dilution_test

import (
	"strings"
	"testing"

	"drawup/dilution/refusal"
)

// Beside the spinal cord: what is preserved, what is not made for it, and what a
// route cannot tell apart.
func TestDangerNeuraxial(t *testing.T) {
	run(t, []danger{
		{"preserved bupivacaine, epidural", "US prescribing information, bupivacaine", "syringe",
			"drug: bupivacaine; presentation: multi-dose vial 250 mg in 50 mL; dose: 50 mg; route: epidural; indication: epidural analgesia", refusal.RouteNotListed, "presentation: ampoule 50 mg in 10 mL", ""},
		{"preserved bupivacaine, caudal", "US prescribing information, bupivacaine", "syringe",
			"drug: bupivacaine; presentation: multi-dose vial 125 mg in 50 mL; dose: 50 mg; route: caudal; indication: caudal block", refusal.RouteNotListed, "presentation: ampoule 50 mg in 20 mL", ""},
		{"preserved lidocaine with adrenaline, epidural", "UK SmPC, lidocaine with adrenaline, 2023", "syringe",
			"drug: lidocaine with adrenaline; dose: 100 mg; route: epidural", refusal.RouteNotListed, "route: infiltration", ""},
		{"preserved prilocaine, spinal", "UK national formulary, prilocaine", "syringe",
			"drug: prilocaine; dose: 50 mg; route: intrathecal", refusal.RouteNotListed, "route: infiltration", ""},
		{"bupivacaine, intrathecal", "US prescribing information, bupivacaine", "syringe",
			"drug: bupivacaine; presentation: ampoule 50 mg in 10 mL; dose: 15 mg; route: intrathecal", refusal.RouteNotListed, "drug: bupivacaine hyperbaric; presentation: ampoule 20 mg in 4 mL; indication: spinal anaesthesia", ""},
		{"bupivacaine with adrenaline, intrathecal", "US prescribing information, bupivacaine with epinephrine", "syringe",
			"drug: bupivacaine with adrenaline; presentation: ampoule 50 mg with 50 microgram in 10 mL; dose: 15 mg; route: intrathecal", refusal.RouteNotListed, "route: infiltration; dose: 50 mg", ""},
		{"lidocaine with adrenaline, intrathecal", "US prescribing information, lidocaine with epinephrine", "syringe",
			"drug: lidocaine with adrenaline; dose: 50 mg; route: intrathecal", refusal.RouteNotListed, "", ""},
		{"bupivacaine 7.5 mg/mL in obstetrics", "US prescribing information, bupivacaine; the strength is not filed", "syringe",
			"drug: bupivacaine; presentation: ampoule 75 mg in 10 mL; dose: 75 mg; route: epidural", refusal.PresentationUnknown, "", ""},
		{"levobupivacaine 7.5 mg/mL into a nerve of the birth canal", "drug profile, levobupivacaine", "syringe",
			"drug: levobupivacaine; presentation: ampoule 75 mg in 10 mL; dose: 75 mg; route: nerve block", refusal.RouteNotListed, "presentation: ampoule 50 mg in 10 mL", ""},
		{"bupivacaine, intravenous regional block", "US prescribing information, bupivacaine", "syringe",
			"drug: bupivacaine; presentation: ampoule 50 mg in 20 mL; dose: 50 mg; route: IV regional", refusal.RouteNotListed, "route: infiltration", ""},
		{"levobupivacaine, intravenous regional block", "drug profile, levobupivacaine", "syringe",
			"drug: levobupivacaine; presentation: ampoule 25 mg in 10 mL; dose: 50 mg; route: IV regional", refusal.RouteNotListed, "route: infiltration; dose: 75 mg", ""},
		{"a local anaesthetic into a vein", "UK guideline, severe local anaesthetic toxicity", "syringe",
			"drug: ropivacaine; presentation: ampoule 75 mg in 10 mL; dose: 75 mg; route: IV", refusal.RouteNotListed, "route: nerve block", ""},
		{"dexamethasone, epidural", "US notice, dexamethasone sodium phosphate", "syringe",
			"drug: dexamethasone; presentation: ampoule 3.3 mg in 1 mL; dose: 3.3 mg; route: epidural", refusal.RouteNotListed, "route: IV", ""},
		{"tranexamic acid, intrathecal", "from memory: a lethal mix-up", "syringe",
			"drug: tranexamic acid; presentation: ampoule 500 mg in 5 mL; amount: 500 mg; route: intrathecal", refusal.RouteNotListed, "route: IV; amount: 500 mg", ""},
		{"ketorolac, epidural", "UK SmPC, ketorolac, 2020", "syringe", "drug: ketorolac; dose: 10 mg; route: epidural", refusal.RouteNotListed, "route: IV", ""},
		{"remifentanil, intrathecal", "Irish SmPC, remifentanil", "syringe",
			"drug: remifentanil; presentation: vial 1 mg; concentration: 50 microgram/mL; volume: 20 mL; diluent: sodium chloride 0.9 %; route: intrathecal", refusal.RouteNotListed, "", ""},
		{"preserved morphine of high strength, intrathecal", "US label, morphine cartridge", "syringe",
			"drug: morphine; presentation: ampoule 10 mg in 1 mL; amount: 10 mg; volume: 10 mL; diluent: sodium chloride 0.9 %; route: intrathecal", refusal.RouteNotListed, "route: IV", ""},
		{"clonidine for a vein, epidural", "US label, clonidine for epidural infusion", "infusion",
			"drug: clonidine; presentation: ampoule 150 microgram in 1 mL; mix: 5000 microgram in 50 mL; route: epidural; start: 30 microgram/h", refusal.RouteNotListed, "presentation: vial 5000 microgram in 10 mL, epidural", ""},
	})
}

// The routes beside the spinal cord are listed for these drugs and no others: the
// local anaesthetics of the label texts, and what the texts add to them.
func TestDangerNothingElseNeuraxial(t *testing.T) {
	f := starter(t)
	allowed := map[string]string{
		"lidocaine": "epidural caudal", "bupivacaine": "epidural caudal", "bupivacaine hyperbaric": "intrathecal",
		"levobupivacaine": "epidural intrathecal", "ropivacaine": "epidural intrathecal", "prilocaine hyperbaric": "intrathecal",
		"chloroprocaine": "intrathecal", "mepivacaine": "epidural", "tetracaine": "intrathecal",
		"clonidine": "epidural", // US label of the epidural vials: by infusion
	}
	for _, d := range f.Drugs() {
		var routes []string
		for _, r := range d.Doses {
			routes = append(routes, r.Routes...)
		}
		for _, r := range d.Rates {
			routes = append(routes, r.Routes...)
		}
		for _, r := range routes {
			switch r {
			case "epidural", "caudal", "intrathecal", "spinal":
				if !strings.Contains(allowed[d.Name], r) {
					t.Errorf("%s has a dose by the route %q, which no label text of the list allows", d.Name, r)
				}
			}
		}
	}
}

// Fractions of the maxima of local anaesthetics add up: six tenths of one and six
// tenths of another are too much (label texts; consensus on combined maxima).
func TestDangerSumOfLocalAnaesthetics(t *testing.T) {
	two := func(second string) string {
		return session + adult + "[[patient.syringe]]\n" +
			asked(t, "drug: lidocaine; presentation: ampoule 200 mg in 20 mL; dose: 60 mg; route: infiltration", "") +
			"[[patient.syringe]]\n" + asked(t, "drug: bupivacaine; presentation: ampoule 50 mg in 20 mL; route: infiltration; dose: "+second, "")
	}
	_, reasons := plan(t, starter(t), two("60 mg"))
	if got := reasons.Refusals().Codes(); len(got) == 0 || got[0] != refusal.LocalSum {
		t.Errorf("got %v, want %s", got, refusal.LocalSum)
	}
	if _, reasons = plan(t, starter(t), two("40 mg")); reasons.Refused() {
		t.Errorf("got %v for sums below one", reasons.Refusals())
	}
}

// Slips of a unit or a point that stand in published pages about relaxants and
// local anaesthetics.
func TestDangerUnitSlipsInPrint(t *testing.T) {
	run(t, []danger{
		{"mivacurium 150 mg/kg for microgram/kg", "drug monograph, mivacurium, Indian edition", "syringe",
			"drug: mivacurium; presentation: ampoule 20 mg in 10 mL; dose: 150 mg/kg", refusal.SlipThousand, "dose: 150 microgram/kg", ""},
		{"rocuronium 0.012 microgram/kg/min for mg/kg/min", "drug repository page, rocuronium", "infusion",
			"drug: rocuronium; presentation: vial 50 mg in 5 mL; standard: 500 mg in 50 mL; start: 0.012 microgram/kg/min", refusal.SlipTen, "start: 0.01 mg/kg/min", ""},
		{"rocuronium 3 mg/kg/h for 0.3", "drug monograph, rocuronium, Malaysian edition", "infusion",
			"drug: rocuronium; presentation: vial 50 mg in 5 mL; standard: 500 mg in 50 mL; start: 3 mg/kg/h", refusal.SlipTen, "start: 0.3 mg/kg/h", ""},
		{"rocuronium 10 mg/kg for 1", "drug monograph, rocuronium, Malaysian edition", "syringe",
			"drug: rocuronium; presentation: vial 50 mg in 5 mL; dose: 10 mg/kg", refusal.SlipTen, "dose: 0.6 mg/kg", ""},
		{"lidocaine 2 g in 500 mg", "bedside card, lidocaine", "infusion",
			"drug: lidocaine; presentation: ampoule 200 mg in 20 mL; mix: 2 g in 500 mg; start: 2 mg/min; indication: arrhythmia", refusal.UnitWrongKind, "mix: 200 mg in 50 mL; diluent: glucose 5 %", ""},
		{"suxamethonium above 500 mg/h", "drug monograph, suxamethonium, Myanmar edition", "infusion",
			"drug: suxamethonium; presentation: ampoule 100 mg in 2 mL; mix: 50 mg in 50 mL; diluent: sodium chloride 0.9 %; accepted_by: A. Example; accepted_reason: invented; start: 8.5 mg/min", refusal.RateAboveHard, "start: 8 mg/min", ""},
		{"neostigmine above 5 mg", "US drug page, neostigmine", "syringe",
			"drug: neostigmine; presentation: ampoule 2.5 mg in 1 mL; dose: 0.07 mg/kg actual", refusal.DoseAboveTotal, "dose: 0.05 mg/kg actual",
			"\n[[patient]]\nid = \"A\"\nsex = \"male\"\nage = \"40 years\"\nheight = \"185 cm\"\nweight = \"80 kg\"\n"},
		{"lidocaine for analgesia above 1.5 mg/kg/h", "Foo and others, Anaesthesia 2021;76:238-250", "infusion",
			"drug: lidocaine; presentation: ampoule 200 mg in 20 mL; mix: 200 mg in 50 mL; diluent: glucose 5 %; start: 1.6 mg/kg/h; indication: analgesia", refusal.RateAboveHard, "start: 1.5 mg/kg/h", ""},
		{"ropivacaine above 28 mg/h", "Hong Kong product text, ropivacaine", "infusion",
			"drug: ropivacaine; presentation: ampoule 40 mg in 20 mL; mix: 100 mg in 50 mL; route: epidural; start: 30 mg/h; indication: epidural analgesia", refusal.RateAboveHard, "start: 28 mg/h", ""},
	})
}

// Fluids and routes that theatre drugs must not meet.
func TestDangerTheatreFluids(t *testing.T) {
	run(t, []danger{
		{"atracurium in compound sodium lactate", "children's hospital parenteral manual, Canada, atracurium", "infusion",
			"drug: atracurium; presentation: ampoule 50 mg in 5 mL; mix: 25 mg in 50 mL; diluent: compound sodium lactate; start: 5 microgram/kg/min", refusal.DiluentForbidden, "diluent: sodium chloride 0.9 %", ""},
		{"cisatracurium in glucose", "hospital intravenous guide, Ireland, cisatracurium", "infusion",
			"drug: cisatracurium; presentation: ampoule 20 mg in 10 mL; mix: 20 mg in 50 mL; diluent: glucose 5 %; start: 2 microgram/kg/min", refusal.DiluentForbidden, "diluent: sodium chloride 0.9 %", ""},
		{"dantrolene in sodium chloride", "hospital intravenous guide, Ireland, dantrolene", "syringe",
			"drug: dantrolene; presentation: vial 20 mg; concentration: 0.33 mg/mL; volume: 50 mL; diluent: sodium chloride 0.9 %; dose: 2 mg/kg", refusal.DiluentForbidden, "", ""},
		{"cyclizine in sodium chloride", "palliative care handbook, New Zealand, cyclizine", "syringe",
			"drug: cyclizine; concentration: 5 mg/mL; volume: 10 mL; diluent: sodium chloride 0.9 %; dose: 50 mg; indication: nausea and vomiting; route: IV", refusal.DiluentForbidden, "diluent: water for injections", ""},
		{"prochlorperazine mesilate into a vein", "UK product text, prochlorperazine mesilate, 2019", "syringe",
			"drug: prochlorperazine; presentation: ampoule 12.5 mg in 1 mL; dose: 12.5 mg; route: IV", refusal.RouteNotListed, "route: IM", ""},
		{"haloperidol into a vein", "Hong Kong product text, haloperidol", "syringe",
			"drug: haloperidol; dose: 5 mg; route: IV", refusal.RouteNotListed, "route: IM; indication: severe agitation", ""},
		{"atropine 0.1 mg for a newborn of 3 kg", "translated neonatal drug page, atropine", "syringe",
			"drug: atropine; presentation: syringe 0.25 mg in 5 mL; dose: 0.1 mg; indication: bradycardia", refusal.FormularyBlank, "", newborn},
		{"atropine below 0.5 mg in an adult", "intensive-care nursing card, atropine", "syringe",
			"drug: atropine; presentation: ampoule 600 microgram in 1 mL; dose: 0.3 mg; indication: bradycardia", refusal.DoseBelowHard, "presentation: syringe 1 mg in 10 mL; dose: 0.5 mg", ""},
	})
}
