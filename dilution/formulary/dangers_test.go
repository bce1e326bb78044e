package formulary_test

import (
	"math/big"
	"slices"
	"strings"
	"testing"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
)

// Pairs that must never share one syringe: the record says so, or no record lets
// them. Either way the planner has nothing to allow them by.
func TestDangerNeverInOneSyringe(t *testing.T) {
	f := starter(t)
	acids := []string{"suxamethonium", "atropine", "rocuronium", "vecuronium", "pancuronium", "mivacurium", "cisatracurium", "atracurium",
		"midazolam", "morphine", "pethidine", "alfentanil", "glycopyrronium", "ephedrine", "phenylephrine", "noradrenaline"}
	for _, c := range []struct {
		a, source string
		b         []string
		named     bool // a record must name the pair, not only its absence
	}{
		{"propofol", "Hong Kong product text and Czech SmPC, remifentanil", []string{"remifentanil"}, true},
		{"ketamine", "Israeli product text, ketamine", []string{"thiopental", "methohexital", "diazepam", "diazepam emulsion"}, true},
		{"esketamine", "Swiss professional information, esketamine", []string{"thiopental", "methohexital", "diazepam", "diazepam emulsion"}, true},
		{"esketamine", "Swiss professional information, esketamine", []string{"aminophylline", "furosemide", "sodium bicarbonate"}, false},
		{"thiopental", "Swiss professional information, thiopental", acids, false},
		{"thiopental", "Swiss professional information, thiopental", []string{"suxamethonium", "atropine", "midazolam", "alfentanil"}, true},
		{"ketorolac", "machine-written pages quoting US prescribing information, ketorolac", []string{"morphine", "pethidine"}, true},
		{"morphine", "children's hospital parenteral manual, Canada, morphine", []string{"pethidine"}, true},
		{"midazolam", "Czech SmPC, midazolam", []string{"thiopental", "clonidine", "diazepam", "dexamethasone"}, true},
		{"midazolam", "Czech SmPC, midazolam", []string{"sodium bicarbonate", "phenytoin", "phenobarbital", "furosemide", "hydrocortisone"}, false},
		{"diazepam", "hospital intravenous guide, Ireland", allBut(f, "diazepam"), false},
		{"diazepam emulsion", "children's hospital parenteral manual, Canada, diazepam emulsion", allBut(f, "diazepam emulsion"), false},
		{"lorazepam", "US prescribing information, lorazepam", allBut(f, "lorazepam"), false},
		{"rocuronium", "Philippine product text, rocuronium", []string{"dexamethasone", "hydrocortisone", "thiopental", "insulin", "cefazolin", "lipid emulsion"}, true},
		{"cisatracurium", "UK SmPC, cisatracurium", []string{"propofol", "thiopental"}, true},
		{"sugammadex", "children's hospital parenteral manual, Canada, sugammadex", []string{"ondansetron", "verapamil"}, false},
		{"lidocaine", "US prescribing information, lidocaine", []string{"bupivacaine", "ropivacaine", "levobupivacaine"}, false},
		{"sodium bicarbonate", "children's hospital parenteral manual, Canada, sodium bicarbonate",
			[]string{"calcium chloride", "calcium gluconate", "adrenaline", "noradrenaline", "dopamine", "dobutamine"}, true},
		{"sodium bicarbonate", "product texts of catecholamines", []string{"isoprenaline", "phenylephrine", "labetalol", "nicardipine", "milrinone"}, false},
		{"potassium chloride", "UK national alert, potassium solutions, 2002", allBut(f, "potassium chloride"), false},
		{"clevidipine", "handbook on injectable drugs, clevidipine", allBut(f, "clevidipine"), false},
		{"phenytoin", "aid organisation, essential drugs, phenytoin", allBut(f, "phenytoin"), false},
		{"amiodarone", "hospital intravenous guide, Ireland, amiodarone", allBut(f, "amiodarone"), false},
		{"paracetamol", "newborn drug protocol, New Zealand, paracetamol", allBut(f, "paracetamol"), false},
		{"gentamicin", "Philippine product text, co-amoxiclav", []string{"co-amoxiclav", "cefazolin", "teicoplanin", "heparin"}, true},
		{"vancomycin", "newborn drug protocol, New Zealand, vancomycin", []string{"heparin", "cefazolin"}, true},
		{"heparin", "opposites", []string{"protamine"}, true},
		{"alprostadil", "hospital guideline copy, alprostadil", []string{"heparin"}, true},
		{"milrinone", "US prescribing information, furosemide", []string{"furosemide"}, true},
		{"aminophylline", "emergency-medicine page, aminophylline", []string{"adrenaline", "noradrenaline", "dobutamine", "amiodarone", "insulin", "verapamil"}, true},
		{"dantrolene", "children's hospital parenteral manual, Canada, dantrolene", allBut(f, "dantrolene"), false},
		{"lipid emulsion", "UK guideline, severe local anaesthetic toxicity", allBut(f, "lipid emulsion"), false},
	} {
		for _, b := range c.b {
			if _, _, ok := f.Find(b); !ok {
				t.Errorf("%s with %s: %s is not filed", c.a, b, b)
			}
			for _, m := range f.Mixes {
				if m.Drugs == [2]string{c.a, b} || m.Drugs == [2]string{b, c.a} {
					t.Errorf("%s with %s is allowed, against %s", c.a, b, c.source)
				}
			}
			if n, ok := f.Forbidden(c.a, b); c.named && (!ok || n.Reason == "") {
				t.Errorf("%s with %s: no record forbids it, against %s", c.a, b, c.source)
			}
		}
	}
}

// allBut is every drug of the formulary but one.
func allBut(f *formulary.Formulary, name string) []string {
	var out []string
	for _, d := range f.Drugs() {
		if d.Name != name {
			out = append(out, d.Name)
		}
	}
	return out
}

// Factors between salt and base, mass and amount of substance, within 2 % of the
// published pairs. Where the record has none the drug is counted as its label does,
// and a pair would have nothing to convert: the row says so, and falls when the
// record gets a factor.
func TestDangerFactors(t *testing.T) {
	f := starter(t)
	for _, c := range []struct{ drug, salt, each, source string }{
		{"noradrenaline", "2", "1", "UK and EU SmPC, noradrenaline: 2 mg of acid tartrate for 1 mg"},
		{"adrenaline", "1.82", "1", "from memory: 1.82 mg of acid tartrate for 1 mg"},
		{"dobutamine", "5.6", "5", "Irish SmPC, dobutamine: 5.6 mg of hydrochloride for 5 mg"},
		{"ketamine", "57.7", "50", "UK SmPC, ketamine: 57.7 mg of hydrochloride for 50 mg"},
		{"esketamine", "28.85", "25", "UK SmPC, esketamine: 28.85 mg of hydrochloride for 25 mg"},
		{"remimazolam", "27.2", "20", "handbook, remimazolam: 27.2 mg of besylate for 20 mg"},
		{"granisetron", "1.12", "1", "handbook, granisetron: 1.12 mg of hydrochloride for 1 mg"},
		{"mivacurium", "2.14", "2", "US prescribing information, mivacurium: 2.14 mg of chloride for 2 mg"},
		{"bupivacaine hyperbaric", "5.28", "5", "UK SmPC, bupivacaine in glucose: 5.28 mg of hydrate for 5 mg"},
		{"dexamethasone", "4.3", "3.3", "UK medicines information: 4.3 mg of sodium phosphate for 3.3 mg"},
	} {
		d, _, ok := f.Find(c.drug)
		if !ok || d.Salt == nil {
			t.Errorf("%s: no salt is stored", c.drug)
			continue
		}
		within2(t, c.drug+", "+c.source, d.Salt.PerMg.Rat(), new(big.Rat).Quo(rational(t, c.salt), rational(t, c.each)))
	}
	for _, c := range []struct{ drug, perGram, source string }{
		{"magnesium sulfate", "4.06", "UK SmPC, magnesium sulfate: 1 g is 4.06 mmol"},
		{"calcium gluconate", "2.25", "Finnish SmPC and US text: 10 mL of 10 % are 2.2 to 2.3 mmol"},
	} {
		d, _, _ := f.Find(c.drug)
		if !d.Substance.Given() {
			t.Errorf("%s: no amount of substance is stored", c.drug)
			continue
		}
		within2(t, c.drug+", "+c.source, d.Substance.Value.PerGram.Rat(), rational(t, c.perGram))
	}
	for _, c := range []struct{ drug, counted string }{
		{"phenylephrine", ""}, {"isoprenaline", "hydrochloride"}, {"terlipressin", "acetate"}, {"phenytoin", "sodium"}, {"phenobarbital", "sodium"},
		{"atracurium", "besilate"}, {"lidocaine", "hydrochloride"}, {"dexamethasone phosphate", "phosphate"}, {"cyclizine", "lactate"},
		{"metaraminol", "base"}, {"milrinone", "base"}, {"salbutamol", "base"}, {"gentamicin", "base"}, {"co-amoxiclav", "amoxicillin and clavulanic acid together"},
		{"calcium chloride", "calcium"}, {"potassium chloride", "potassium"},
	} {
		d, _, ok := f.Find(c.drug)
		if !ok || d.CountedAs != c.counted || d.Salt != nil {
			t.Errorf("%s: got counted as %q, with a salt: %v; want %q without", c.drug, d.CountedAs, d.Salt != nil, c.counted)
		}
	}
}

// within2 wants two factors within 2 % of each other.
func within2(t *testing.T, what string, got, want *big.Rat) {
	t.Helper()
	off := new(big.Rat).Quo(new(big.Rat).Sub(got, want), want)
	if off.Abs(off).Cmp(big.NewRat(2, 100)) > 0 {
		t.Errorf("%s: got %s, want %s within 2 %%", what, got.FloatString(4), want.FloatString(4))
	}
}

func rational(t *testing.T, s string) *big.Rat {
	t.Helper()
	r, ok := new(big.Rat).SetString(s)
	if !ok {
		t.Fatalf("%q is no number", s)
	}
	return r
}

// Containers whose contents are their own conversion: amounts of substance,
// percentages and units as documents print them.
func TestDangerContents(t *testing.T) {
	f := starter(t)
	for _, c := range []struct{ drug, id, concentration, source string }{
		{"potassium chloride", "ampoule 20 mmol in 10 mL", "2 mmol/mL", "Drug Ther Bull: 15 %, 10 mL, 1.5 g, 20 mmol"},
		{"calcium chloride", "ampoule 6.8 mmol in 10 mL", "0.68 mmol/mL", "UK SmPC, calcium chloride 10 %"},
		{"calcium chloride", "ampoule 10 mmol in 10 mL", "1 mmol/mL", "UK SmPC, calcium chloride 14.7 %"},
		{"sodium bicarbonate", "ampoule 10 mmol in 10 mL", "1 mmol/mL", "hospital intravenous guide, Ireland: 8.4 %"},
		{"sodium bicarbonate", "bottle 75 mmol in 500 mL", "0.15 mmol/mL", "hospital intravenous guide, Ireland: 1.26 %"},
		{"digoxin", "ampoule 500 microgram in 2 mL", "0.025 %", "UK product text, digoxin: 250 micrograms/mL is 0.025 %"},
		{"magnesium sulfate", "ampoule 5 g in 10 mL", "50 %", "UK SmPC, magnesium sulfate: 50 % is 500 mg/mL"},
		{"adrenaline", "ampoule 1 mg in 1 mL", "1:1000", "review of formulations: 1:1000 is 1 mg/mL"},
		{"adrenaline", "syringe 1 mg in 10 mL", "1:10000", "review of formulations: 1:10 000 is 0.1 mg/mL"},
		{"glucose", "vial 25 g in 50 mL", "50 %", "per cent by definition"},
		{"mannitol", "bag 100 g in 500 mL", "20 %", "hospital intravenous guide, Ireland: 100 g in 500 mL"},
		{"lipid emulsion", "bag 100 g in 500 mL", "20 %", "US label, lipid emulsion 20 %"},
		{"insulin", "vial 1000 units in 10 mL", "100 units/mL", "product text, human insulin"},
	} {
		d, _, _ := f.Find(c.drug)
		p, ok := d.Presentation(c.id)
		if !ok {
			t.Errorf("%s: no %s", c.drug, c.id)
			continue
		}
		have, err := p.Amount.In(p.Volume)
		want, err2 := quantity.ParseConcentration(c.concentration)
		if err != nil || err2 != nil || !have.Equal(want) {
			t.Errorf("%s, %s: got %v, want %s (%s; %v %v)", c.drug, c.id, have, c.concentration, c.source, err, err2)
		}
	}
	d, _, _ := f.Find("co-amoxiclav")
	if p, ok := d.Presentation("vial 1200 mg"); !ok || p.Amount.Written() != "1200 mg" {
		t.Errorf("co-amoxiclav 1.2 g is the sum of both parts: got %v", p.Amount)
	}
}

// What cannot be a number of the record must stand in a sentence of it: what the
// preparer has to read.
func TestDangerSaidInWords(t *testing.T) {
	f := starter(t)
	for _, c := range []struct{ drug, words, source string }{
		{"diazepam", "PVC", "hospital intravenous guide, Ireland, diazepam solution"},
		{"diazepam emulsion", "PVC", "hospital intravenous guide, Ireland, diazepam emulsion"},
		{"lorazepam", "PVC", "solubility and sorption of lorazepam, 1996"},
		{"sufentanil", "PVC", "handbook on injectable drugs, sufentanil"},
		{"dexmedetomidine", "rubber", "US prescribing information, dexmedetomidine"},
		{"glyceryl trinitrate", "PVC", "hospital bedside page and textbook, glyceryl trinitrate"},
		{"sodium nitroprusside", "light", "handbook on injectable drugs, nitroprusside"},
		{"levobupivacaine", "obstetric", "drug profile, levobupivacaine: 7.5 mg/mL"},
		{"isoprenaline", "130", "copies of UK SmPCs, isoprenaline: the rate to stop at"},
		{"adenosine", "rapid", "product text, adenosine"},
		{"mannitol", "glucose 5 %", "hospital intravenous guide, Ireland, mannitol: flush"},
		{"phenytoin", "filter", "hospital intravenous guide, Ireland, phenytoin"},
		{"insulin", "20 mL", "neonatal drug manual, insulin: prime and discard"},
		{"potassium chloride", "no diluent", "UK national alert, potassium solutions, 2002"},
		{"tranexamic acid", "intrathecal", "from memory: a lethal mix-up"},
		{"lidocaine", "4 h", "Foo and others, Anaesthesia 2021: no block within 4 h"},
		{"dantrolene", "water", "malignant hyperthermia guideline: never hang the water"},
		{"atropine", "plastic", "Lewis and others, AANA J 1994: half lost in four days"},
		{"clevidipine", "12 h", "handbook on injectable drugs, clevidipine"},
		{"remimazolam", "holds more than 20 mg", "handbook on injectable drugs, remimazolam"},
		{"teicoplanin", "draw 3 mL", "handbook on injectable drugs, teicoplanin: less out than in"},
		{"esketamine", "half", "machine-written page, ketamine: not to be swapped"},
		{"noradrenaline", "base", "UK SmPC, noradrenaline"},
		{"carbetocin", "once", "UK drug monograph, carbetocin"},
		{"gentamicin", "infusion", "product texts, gentamicin: they disagree"},
		{"neostigmine", "glycopyrronium", "US prescribing information, neostigmine: never alone"},
	} {
		d, _, ok := f.Find(c.drug)
		if !ok || !slices.ContainsFunc(words(d), func(s string) bool { return strings.Contains(strings.ToLower(s), strings.ToLower(c.words)) }) {
			t.Errorf("%s: no sentence says %q (%s)", c.drug, c.words, c.source)
		}
	}
}

// words are the cautions of a drug, the notes of its containers and its marks.
func words(d formulary.Drug) []string {
	out := slices.Clone(d.Flags)
	for _, n := range d.Cautions {
		out = append(out, n.Text)
	}
	for _, p := range d.Presentations {
		for _, n := range p.Notes {
			out = append(out, n.Text)
		}
	}
	return out
}

// Conflicts that change a syringe, settled on the cautious side: no figure of the
// record under this name is higher than the one named.
func TestDangerCautiousFigures(t *testing.T) {
	f := starter(t)
	for _, c := range []struct{ drug, entry, most, source string }{
		{"phenylephrine", "stability, glucose 5 %, room", "4 h", "US prescribing information, against 14 to 60 days in studies"},
		{"phenylephrine", "stability, glucose 5 %, refrigerator", "24 h", "US prescribing information"},
		{"adrenaline", "stability, glucose 5 %, room", "24 h", "secondary page; 4 h from memory"},
		{"noradrenaline", "stability, glucose 5 %, room", "24 h", "secondary page; a newborn protocol changes after 12 h"},
		{"insulin", "stability, sodium chloride 0.9 %, room", "24 h", "product text, against 48 h and 48 h"},
		{"clevidipine", "stability, neat, room", "12 h", "handbook, against 4 h in the older text"},
		{"phenytoin", "stability, sodium chloride 0.9 %, room", "60 min", "hospital intravenous guide, Ireland, against 2 to 4 h"},
		{"thiopental", "stability, any, room", "7 h", "UK SmPC, 2010"},
		{"propofol", "stability, any, room", "6 h", "teaching page; drawn into a syringe"},
		{"paracetamol", "stability, glucose 5 %, room", "60 min", "hospital sheet"},
		{"dantrolene", "stability, neat, room", "6 h", "children's hospital parenteral manual, Canada"},
		{"vasopressin", "stability, glucose 5 %, room", "18 h", "US prescribing information"},
		{"ephedrine", "dose for low blood pressure during anaesthesia, IV, from 12 years: hard maximum", "7.5 mg", "UK product text, against 9 mg"},
		{"ephedrine", "dose for low blood pressure during anaesthesia, IV, from 12 years: maximum of a course", "30 mg", "UK SmPC"},
		{"adenosine", "dose for supraventricular tachycardia, IV, from 18 years: highest first dose", "3 mg", "UK text, against 6 mg"},
		{"verapamil", "dose for fast heart rhythm, IV, from 18 years: highest repeat", "5 mg", "hospital intravenous guide, Ireland, against 10 mg"},
		{"aminophylline", "dose for loading dose, IV, from 18 years, per kg: usual highest", "5 mg/kg", "health-board appendix, Scotland, against 6 mg/kg"},
		{"aminophylline", "dose for loading dose, IV, from 18 years, per kg: absolute maximum", "500 mg", "hospital intravenous guide, Ireland"},
		{"amiodarone", "dose rate for continuation, IV, from 18 years: maximum of a course", "1200 mg", "Slovak SmPC, against 2100 mg"},
		{"labetalol", "dose for lowering of blood pressure, IV, from 18 years: maximum of a course", "200 mg", "hospital bedside guide, UK, against 300 mg"},
		{"hydralazine", "dose for lowering of blood pressure, IV, from 18 years: hard maximum", "10 mg", "UK SmPC, against 20 to 40 mg"},
		{"flumazenil", "dose for reversal after anaesthesia, IV, from 18 years: absolute maximum", "1 mg", "Malaysian product text, against 3 mg in memory"},
		{"flumazenil", "dose rate for reversal in intensive care, IV, from 18 years: hard maximum", "0.4 mg/h", "Malaysian product text"},
		{"paracetamol", "dose for pain or fever, over 50 kg, IV, from 18 years: maximum of a day", "4 g", "Irish SmPC"},
		{"ketorolac", "dose for pain after surgery, IV IM, from 18 years, under 65 years: maximum of a day", "90 mg", "UK, against 120 mg in the US"},
		{"carboprost", "dose for bleeding after birth, IM, from 18 years: maximum of a course", "2 mg", "UK drug monograph, against 12 mg in the US"},
		{"oxytocin", "dose rate for labour, IV, from 18 years: hard maximum", "20 milliunits/min", "UK product text"},
		{"lipid emulsion", "dose rate for local anaesthetic toxicity, IV, per kg: hard maximum", "6 g/kg/h", "UK safety guideline: 30 mL/kg/h"},
		{"suxamethonium", "dose for intubation, IM, from 18 years, per kg: absolute maximum", "150 mg", "US label: into muscle"},
		{"bupivacaine", "local anaesthetic maximum, without adrenaline, from 18 years: in all", "150 mg", "UK, from memory, against 175 mg in the US"},
		{"bupivacaine", "local anaesthetic maximum, with adrenaline, from 18 years: by weight", "2 mg/kg", "UK teaching: adrenaline adds nothing"},
		{"lidocaine", "local anaesthetic maximum, without adrenaline, from 18 years: in all", "200 mg", "Irish and UK texts, against 300 mg in the US"},
		{"lidocaine", "local anaesthetic maximum, with adrenaline, from 18 years: by weight", "6 mg/kg", "UK teaching, against 7 in the US"},
		{"ropivacaine", "local anaesthetic maximum, without adrenaline, from 18 years: in a day", "675 mg", "UK, from memory, against 770 and 800 mg"},
		{"magnesium sulfate", "dose rate for magnesium deficiency, IV, from 18 years: hard maximum", "2 g/h", "UK SmPC"},
		{"tranexamic acid", "dose for bleeding after birth, IV, from 18 years: maximum of a course", "2 g", "aid organisation"},
		{"remifentanil", "concentration for infusion, any line: highest", "250 microgram/mL", "Hong Kong product text, against 400 unlicensed"},
		{"midazolam", "dose rate for sedation in intensive care, IV, from 18 years, per kg: usual highest", "0.1 mg/kg/h", "US, against 0.2 in Europe"},
		{"sufentanil", "dose for balanced anaesthesia, ventilated, IV, from 18 years, under 65 years, per kg: usual highest", "2 microgram/kg", "German texts, against 5 and 8"},
		{"propofol", "dose rate for sedation in intensive care, IV, from 18 years, per kg: hard maximum", "4 mg/kg/h", "hospital intravenous guide, Ireland"},
	} {
		d, _, ok := f.Find(c.drug)
		i := slices.IndexFunc(d.Entries(), func(e formulary.Entry) bool { return e.Name == c.entry })
		if !ok || i < 0 {
			t.Errorf("%s: nothing is stored as %q", c.drug, c.entry)
			continue
		}
		if above(t, d.Entries()[i].Text, c.most) {
			t.Errorf("%s, %s: got %s, want at most %s (%s)", c.drug, c.entry, d.Entries()[i].Text, c.most, c.source)
		}
	}
}

// above reports that one figure is higher than another of its kind.
func above(t *testing.T, a, b string) bool {
	t.Helper()
	if n, err := compareText(a, b, quantity.ParseDose, quantity.Dose.Cmp); err == nil {
		return n > 0
	}
	if n, err := compareText(a, b, quantity.ParseDoseRate, quantity.DoseRate.Cmp); err == nil {
		return n > 0
	}
	if n, err := compareText(a, b, quantity.ParseConcentration, quantity.Concentration.Cmp); err == nil {
		return n > 0
	}
	minutes := func(s string) *big.Rat {
		number, unit, _ := strings.Cut(s, " ")
		return new(big.Rat).Mul(rational(t, number), big.NewRat(map[string]int64{"min": 1, "h": 60, "days": 1440}[unit], 1))
	}
	return minutes(a).Cmp(minutes(b)) > 0
}

func compareText[T any](a, b string, parse func(string) (T, error), cmp func(T, T) (int, error)) (int, error) {
	x, err := parse(a)
	if err != nil {
		return 0, err
	}
	y, err := parse(b)
	if err != nil {
		return 0, err
	}
	return cmp(x, y)
}
