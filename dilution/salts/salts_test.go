package salts

import (
	"math/big"
	"regexp"
	"strconv"
	"strings"
	"testing"

	"drawup/dilution/quantity"
)

// given are the IUPAC abridged standard atomic weights of 2021 (Prohaska et
// al., Pure Appl Chem 2022), in units of 0.00001, as the calculation reference
// lists them in a4.
func given() map[string]int64 {
	return map[string]int64{"H": 100800, "C": 1201100, "N": 1400700, "O": 1599900, "Na": 2298977, "Mg": 2430500,
		"P": 3097376, "S": 3206000, "Cl": 3545000, "K": 3909830, "Ca": 4007800}
}

func sum(t *testing.T, formula string) int64 {
	t.Helper()
	part := regexp.MustCompile(`^(\d*)((?:[A-Z][a-z]?\d*)+)$`)
	atom := regexp.MustCompile(`([A-Z][a-z]?)(\d*)`)
	number := func(s string) int64 {
		if s == "" {
			return 1
		}
		n, err := strconv.ParseInt(s, 10, 64)
		if err != nil {
			t.Fatal(err)
		}
		return n
	}
	var total int64
	for _, p := range strings.Split(formula, ".") {
		m := part.FindStringSubmatch(p)
		if m == nil {
			t.Fatalf("formula %q: got part %q, want atoms", formula, p)
		}
		for _, a := range atom.FindAllStringSubmatch(m[2], -1) {
			w, ok := given()[a[1]]
			if !ok {
				t.Fatalf("formula %q: no weight for %s", formula, a[1])
			}
			total += number(m[1]) * w * number(a[2])
		}
	}
	return total
}

// Molar masses of formulas, to the last digit: IUPAC weights added by hand
// (calcium gluconate: 40.078 + 2 × 195.147 + 18.015).
func TestMolarMass(t *testing.T) {
	for formula, want := range map[string]string{"H2O": "18.015", "NaCl": "58.43977", "MgSO4.7H2O": "246.466", "KCl": "74.5483",
		"CaCl2.2H2O": "147.008", "Ca(C6H11O7)2.H2O": "448.387", "NaHCO3": "84.00577"} {
		got, err := MolarMass(formula)
		if err != nil {
			t.Errorf("%s: %v", formula, err)
			continue
		}
		w, _ := new(big.Rat).SetString(want)
		if got.Cmp(w) != 0 {
			t.Errorf("%s: got %s, want %s", formula, got.FloatString(5), want)
		}
	}
	for _, bad := range []string{"", "X2", "H2O)", "(H2O", "h2o", "NaCl.", "Ca((((H))))", "2"} {
		if m, err := MolarMass(bad); err == nil {
			t.Errorf("%q: got %s, want an error", bad, m.FloatString(5))
		}
	}
}

func TestMolarMassesAreSumsOfAtomicWeights(t *testing.T) {
	for _, s := range table() {
		if got := sum(t, s.formula); got != s.molar {
			t.Errorf("%s: got %d, want %d from %s", s.name, s.molar, got, s.formula)
		}
		if s.base != "" && sum(t, s.baseFormula) != s.baseMolar {
			t.Errorf("%s: base: got %d, want %d", s.name, s.baseMolar, sum(t, s.baseFormula))
		}
	}
}

// TestMolarMassesOfReference compares with the masses printed in the tables a4
// and a5 of the calculation reference, to their three decimals.
func TestMolarMassesOfReference(t *testing.T) {
	want := map[string]string{
		"sodium chloride": "58.440", "potassium chloride": "74.548", "sodium bicarbonate": "84.006",
		"calcium chloride dihydrate": "147.008", "calcium chloride hexahydrate": "219.068",
		"calcium gluconate monohydrate": "448.387", "magnesium sulfate heptahydrate": "246.466",
		"magnesium chloride hexahydrate": "203.295", "potassium dihydrogen phosphate": "136.084",
		"dipotassium hydrogen phosphate": "174.174", "sodium dihydrogen phosphate dihydrate": "156.006",
		"sodium acetate trihydrate": "136.079", "sodium lactate": "112.060", "trometamol": "121.136",
		"glucose": "180.156", "glucose monohydrate": "198.171",
		"noradrenaline acid tartrate monohydrate": "337.281", "adrenaline acid tartrate": "333.293",
		"adrenaline hydrochloride": "219.665", "dobutamine hydrochloride": "337.844", "dopamine hydrochloride": "189.639",
		"isoprenaline hydrochloride": "247.719", "phenylephrine hydrochloride": "203.666",
		"metaraminol acid tartrate": "317.294", "ephedrine hydrochloride": "201.694", "fentanyl citrate": "528.602",
		"remifentanil hydrochloride": "412.911", "sufentanil citrate": "578.677", "alfentanil hydrochloride": "452.984",
		"morphine sulfate pentahydrate": "758.833", "ketamine hydrochloride": "274.185",
		"lidocaine hydrochloride monohydrate": "288.816", "bupivacaine hydrochloride monohydrate": "342.908",
		"dexmedetomidine hydrochloride": "236.743", "atropine sulfate monohydrate": "694.837",
		"suxamethonium chloride dihydrate": "397.334", "ropivacaine hydrochloride monohydrate": "328.881",
		"cisatracurium besilate": "1243.487", "aminophylline dihydrate": "456.464",
	}
	for name, printed := range want {
		s, ok := Find(name)
		if !ok {
			t.Errorf("%s: not found", name)
			continue
		}
		if got := s.GramsPerMole().FloatString(3); got != printed {
			t.Errorf("%s: got %s g/mol, want %s", name, got, printed)
		}
	}
}

// TestIonsAreNeutral checks that the charges of each salt's ions cancel, the
// rule of electroneutrality, so that milliequivalents are the same by cation
// and by anion. The two acid phosphates count phosphate as the salt holds it.
func TestIonsAreNeutral(t *testing.T) {
	for _, s := range table() {
		if len(s.ions) != 2 {
			continue
		}
		if a, b := s.ions[0].Count*s.ions[0].Charge, s.ions[1].Count*s.ions[1].Charge; a != b {
			t.Errorf("%s: charges %d and %d do not cancel", s.name, a, b)
		}
	}
}

// TestPublishedFigures holds the figures that labels and manuals print; each
// line names where.
func TestPublishedFigures(t *testing.T) {
	for _, c := range []struct {
		salt, ion, mg, want string
		places              int
		source              string
	}{
		{"sodium", "", "6.7", "0.29", 2, "UK/EU SmPC noradrenaline 1 mg/mL concentrate"},
		{"magnesium sulfate heptahydrate", "", "500", "2", 0, "UK SmPC magnesium sulfate 50 % w/v, per mL"},
		{"magnesium sulfate heptahydrate", "magnesium", "4000", "16", 0, "UK SmPC magnesium sulfate 50 % w/v, 4 g"},
		{"calcium chloride dihydrate", "calcium", "1000", "6.8", 1, "New Zealand intensive-care drug manual, appendix 10"},
		{"calcium chloride dihydrate", "chloride", "1000", "13.6", 1, "New Zealand intensive-care drug manual, appendix 10"},
		{"sodium chloride", "sodium", "4500", "77", 0, "US product label, potassium chloride in 0.45 % sodium chloride"},
		{"potassium chloride", "", "1490", "20", 0, "US product label, potassium chloride in 0.45 % sodium chloride"},
		{"sodium bicarbonate", "", "84", "1.0", 1, "New Zealand intensive-care drug manual, appendix 10"},
	} {
		s, _ := Find(c.salt)
		if c.ion != "" {
			var err error
			if s, err = s.Counting(c.ion); err != nil {
				t.Fatal(err)
			}
		}
		mass, err := quantity.ParseAmount(c.mg + " mg")
		if err != nil {
			t.Fatal(err)
		}
		got, err := s.Moles(mass)
		if err != nil {
			t.Fatal(err)
		}
		if text := got.Rat().FloatString(c.places); text != c.want {
			t.Errorf("%s mg of %s: got %s mmol, want %s (%s)", c.mg, c.salt, text, c.want, c.source)
		}
		back, err := s.Mass(got)
		if err != nil || !back.Equal(mass) {
			t.Errorf("%s: back to mass: got %v, %v", c.salt, back.Rat(), err)
		}
	}
}

// TestMilliequivalents uses the US product label of magnesium chloride
// hexahydrate 200 mg/mL, which prints 1.97 mEq/mL.
func TestMilliequivalents(t *testing.T) {
	s, _ := Find("magnesium chloride hexahydrate")
	moles, err := s.OfCharge(big.NewRat(197, 100))
	if err != nil {
		t.Fatal(err)
	}
	mass, err := s.Mass(moles)
	if err != nil {
		t.Fatal(err)
	}
	if got := mass.Rat().FloatString(0); got != "200" {
		t.Errorf("got %s mg/mL, want 200", got)
	}
	if _, err := mustFind(t, "glucose").OfCharge(big.NewRat(1, 1)); err == nil {
		t.Error("got milliequivalents of glucose, want an error")
	}
}

func mustFind(t *testing.T, name string) Salt {
	t.Helper()
	s, ok := Find(name)
	if !ok {
		t.Fatalf("%s: not found", name)
	}
	return s
}

// TestSaltAndBase uses the SmPC of noradrenaline (2 mg of acid tartrate is 1 mg
// of base) and the US prescribing information of dobutamine (1.12 to 1).
func TestSaltAndBase(t *testing.T) {
	for _, c := range []struct {
		salt, mg, want string
		places         int
	}{
		{"noradrenaline acid tartrate monohydrate", "2", "1.0", 1},
		{"dobutamine hydrochloride", "1.12", "1.00", 2},
		{"adrenaline acid tartrate", "1.8", "0.99", 2}, // BP 2012: 0.9 to 1.1 mg/mL of base
		{"aminophylline dihydrate", "127", "100", 0},   // University of Zurich, veterinary drug compendium
		{"cisatracurium besilate", "2.68", "2", 0},     // 2 mg/mL as cation, sum of atomic weights
	} {
		a, _ := quantity.ParseAmount(c.mg + " mg")
		s := mustFind(t, c.salt)
		base, err := s.ToBase(a)
		if err != nil {
			t.Fatal(err)
		}
		if got := base.Rat().FloatString(c.places); got != c.want {
			t.Errorf("%s: got %s mg of base, want %s", c.salt, got, c.want)
		}
		if back, err := s.ToSalt(base); err != nil || !back.Equal(a) {
			t.Errorf("%s: back to salt: got %v, %v", c.salt, back.Rat(), err)
		}
	}
}

func TestRefusals(t *testing.T) {
	units, _ := quantity.ParseAmount("5 units")
	mg, _ := quantity.ParseAmount("5 mg")
	s := mustFind(t, "sodium chloride")
	if _, err := s.Moles(units); err == nil {
		t.Error("units became mmol")
	}
	if _, err := s.Mass(mg); err == nil {
		t.Error("mass became mass")
	}
	if _, err := s.ToBase(mg); err == nil {
		t.Error("sodium chloride has a base")
	}
	if _, err := s.Counting("calcium"); err == nil {
		t.Error("sodium chloride holds calcium")
	}
	if _, err := mustFind(t, "morphine sulfate pentahydrate").ToSalt(units); err == nil {
		t.Error("units became a salt's mass")
	}
	if _, ok := Find("calcium chloride"); ok {
		t.Error("calcium chloride without its water was found")
	}
}

// TestPharmacopoeialMasses compares with masses printed by pharmacopoeias and
// labels, within one in five thousand: older tables use older atomic weights.
func TestPharmacopoeialMasses(t *testing.T) {
	for _, c := range []struct{ salt, mass, source string }{
		{"ketamine hydrochloride", "274.2", "British Pharmacopoeia, Ph. Eur. monograph 1020"},
		{"morphine sulfate pentahydrate", "758.83", "United States Pharmacopeia 32"},
		{"atropine sulfate monohydrate", "694.83", "United States Pharmacopeia 32"},
		{"lidocaine hydrochloride monohydrate", "288.81", "United States Pharmacopeia 35"},
		{"fentanyl citrate", "528.60", "United States Pharmacopeia 2025"},
		{"dopamine hydrochloride", "189.64", "US prescribing information, dopamine"},
		{"phenylephrine hydrochloride", "203.67", "University of Zurich, veterinary drug compendium"},
		{"potassium dihydrogen phosphate", "136.1", "intensive-care teaching text: 1.361 g in 10 mL is 1 mmol/mL"},
		{"glucose monohydrate", "198.17", "US product labels"},
		{"suxamethonium chloride dihydrate", "397.34", "United States Pharmacopeia 2025"},
		{"aminophylline dihydrate", "456.46", "United States Pharmacopeia 2025"},
		{"cisatracurium besilate", "1243.49", "US prescribing information, atracurium"},
	} {
		want, _ := new(big.Rat).SetString(c.mass)
		off := new(big.Rat).Sub(mustFind(t, c.salt).GramsPerMole(), want)
		if off.Abs(off).Cmp(want.Quo(want, big.NewRat(5000, 1))) > 0 {
			t.Errorf("%s: got %s, want %s (%s)", c.salt, mustFind(t, c.salt).GramsPerMole().FloatString(3), c.mass, c.source)
		}
	}
	base, err := mustFind(t, "dopamine hydrochloride").ToBase(quantity.AmountOf(big.NewRat(80, 1), quantity.Milligram()))
	if err != nil || base.Rat().FloatString(1) != "64.6" {
		t.Errorf("80 mg of dopamine hydrochloride: got %v, %v, want 64.6 mg of base (US prescribing information)", base.Rat(), err)
	}
}
