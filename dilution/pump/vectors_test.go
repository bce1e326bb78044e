package pump

import (
	"errors"
	"math/big"
	"testing"

	"drawup/dilution/quantity"
)

// Sources of the published rows. A row's id is the one it has in the project's
// collection of worked examples.
const (
	cisatracurium = "US prescribing information, cisatracurium, section 2.6 tables 1 and 2"
	criticalCare  = "Critical Care Drug Infusion, hospital rate grids, no date"
	dobutamine    = "US prescribing information, dobutamine, rate table"
	noradrenaline = "UK/EU SmPC, noradrenaline 1 mg/mL concentrate"
	newborn       = "New Zealand newborn drug guideline, prostaglandin E1, no date"
	recipes       = "emergency infusion recipes, medical handbook section, no date"
	nurses        = "Pharmacology for Nurses, open textbook, 2024, Dosage Calculations"
	bivalirudin   = "US prescribing information, bivalirudin, section 2.3 table 1"
	nicardipine   = "prescribing information, nicardipine 0.1 mg/mL, titration paragraph"
	handOut       = "Drug Calculations: Worked solutions, hospital hand-out, no date"
	worksheet     = "Dimensional analysis practice, college worksheet with answers, no date"
	infusionSheet = "Critical care infusion prescribing sheet, hospital, no date"
	nitroglycerin = "nursing education page, dosage calculation: nitroglycerin, 2024"
	formulas      = "Need to know math formulas, student sheet, no date"
	familyNotes   = "family practice notebook, esmolol, no date"
	calculation   = "Open nursing dosage-calculation course, module 6"
)

func dose(t *testing.T, s string) quantity.DoseRate {
	t.Helper()
	d, err := quantity.ParseDoseRate(s)
	if err != nil {
		t.Fatal(err)
	}
	return d
}

func conc(t *testing.T, s string) quantity.Concentration {
	t.Helper()
	c, err := quantity.ParseConcentration(s)
	if err != nil {
		t.Fatal(err)
	}
	return c
}

func step(t *testing.T, s string) quantity.FlowRate {
	t.Helper()
	f, err := quantity.ParseFlowRate(s + " mL/h")
	if err != nil {
		t.Fatal(err)
	}
	return f
}

// by reads "70 kg", "1.8 m2" or "" for an absolute dose rate.
func by(t *testing.T, s string) Per {
	t.Helper()
	if s == "" {
		return PerNothing()
	}
	if w, err := quantity.ParseBodyWeight(s); err == nil {
		return PerWeight(w)
	}
	a, err := quantity.ParseSurface(s)
	if err != nil {
		t.Fatal(err)
	}
	return PerSurface(a)
}

// A row is one published rate: on the step of its last printed digit.
type row struct{ id, dose, by, mix, step, rate string }

func hold(t *testing.T, source string, rows []row) {
	t.Helper()
	for _, r := range rows {
		s, err := Set(dose(t, r.dose), by(t, r.by), conc(t, r.mix), step(t, r.step))
		if err != nil || s.Rate.Exact() != r.rate {
			t.Errorf("%s: got %s mL/h, %v, want %s (%s)", r.id, s.Rate.Exact(), err, r.rate, source)
		}
	}
}

func TestCisatracuriumGrid(t *testing.T) {
	const weak, strong = "0.1 mg/mL", "0.4 mg/mL"
	hold(t, cisatracurium, []row{
		{"A001", "1 mcg/kg/min", "10 kg", weak, "1", "6"},
		{"A002", "2 mcg/kg/min", "10 kg", weak, "1", "12"},
		{"A003", "5 mcg/kg/min", "10 kg", weak, "1", "30"},
		{"A004", "1.5 mcg/kg/min", "45 kg", weak, "1", "41"}, // 40.5, a tie goes up
		{"A005", "3 mcg/kg/min", "45 kg", weak, "1", "81"},
		{"A006", "1 mcg/kg/min", "70 kg", weak, "1", "42"},
		{"A007", "2 mcg/kg/min", "70 kg", weak, "1", "84"},
		{"A008", "5 mcg/kg/min", "70 kg", weak, "1", "210"},
		{"A009", "1.5 mcg/kg/min", "100 kg", weak, "1", "90"},
		{"A010", "3 mcg/kg/min", "100 kg", weak, "1", "180"},
		{"A011", "1 mcg/kg/min", "10 kg", strong, "0.1", "1.5"},
		{"A012", "2 mcg/kg/min", "10 kg", strong, "0.1", "3"},
		{"A013", "5 mcg/kg/min", "10 kg", strong, "0.1", "7.5"},
		{"A014", "1.5 mcg/kg/min", "45 kg", strong, "0.1", "10.1"},
		{"A015", "3 mcg/kg/min", "45 kg", strong, "0.1", "20.3"}, // 20.25, a tie goes up
		{"A016", "1 mcg/kg/min", "70 kg", strong, "0.1", "10.5"},
		{"A017", "2 mcg/kg/min", "70 kg", strong, "0.1", "21"},
		{"A018", "5 mcg/kg/min", "70 kg", strong, "0.1", "52.5"},
		{"A019", "1.5 mcg/kg/min", "100 kg", strong, "0.1", "22.5"},
		{"A020", "3 mcg/kg/min", "100 kg", strong, "0.1", "45"},
	})
}

func TestAdrenalineGrid(t *testing.T) {
	const mix = "2 mg in 50 mL"
	hold(t, criticalCare, []row{
		{"A030", "0.025 mcg/kg/min", "30 kg", mix, "0.1", "1.1"},
		{"A031", "0.025 mcg/kg/min", "50 kg", mix, "0.1", "1.9"},
		{"A032", "0.025 mcg/kg/min", "70 kg", mix, "0.1", "2.6"},
		{"A033", "0.05 mcg/kg/min", "30 kg", mix, "0.1", "2.3"}, // 2.25, a tie goes up
		{"A034", "0.05 mcg/kg/min", "90 kg", mix, "0.1", "6.8"},
		{"A035", "0.075 mcg/kg/min", "70 kg", mix, "0.1", "7.9"},
		{"A036", "0.1 mcg/kg/min", "70 kg", mix, "0.1", "10.5"},
		{"A037", "0.125 mcg/kg/min", "60 kg", mix, "0.1", "11.3"},
		{"A038", "0.15 mcg/kg/min", "90 kg", mix, "0.1", "20.3"},
		{"A039", "0.175 mcg/kg/min", "30 kg", mix, "0.1", "7.9"},
		{"A040", "0.2 mcg/kg/min", "80 kg", mix, "0.1", "24"},
		{"A041", "0.25 mcg/kg/min", "50 kg", mix, "0.1", "18.8"},
		{"A042", "0.3 mcg/kg/min", "100 kg", mix, "0.1", "45"},
		{"A043", "0.35 mcg/kg/min", "70 kg", mix, "0.1", "36.8"},
		{"A044", "0.45 mcg/kg/min", "90 kg", mix, "0.1", "60.8"},
		{"A045", "0.5 mcg/kg/min", "60 kg", mix, "0.1", "45"},
	})
}

// TestOtherRates holds single published rates in other units.
func TestOtherRates(t *testing.T) {
	hold(t, bivalirudin, []row{{"A059", "1.75 mg/kg/h", "50 kg", "5 mg/mL", "0.1", "17.5"}})
	hold(t, nicardipine, []row{
		{"A070", "5 mg/h", "", "0.1 mg/mL", "1", "50"},
		{"A071", "15 mg/h", "", "0.1 mg/mL", "1", "150"},
	})
	hold(t, nitroglycerin, []row{{"A087", "5 mcg/min", "", "50 mg in 250 mL", "0.1", "1.5"}})
	hold(t, infusionSheet, []row{{"A092", "500 mcg/kg/h", "70 kg", "500 mg in 500 mL", "1", "35"}})
	hold(t, recipes, []row{{"A098", "0.5 mcg/kg/min", "70 kg", "2.5 mg/mL", "0.1", "0.8"}})
	hold(t, nurses, []row{{"A102", "5 mcg/kg/min", "80 kg", "800 mg in 500 mL", "1", "15"}}) // 176 lb at 2.2 lb/kg
	hold(t, worksheet, []row{{"A111", "1200 units/h", "", "20000 units in 250 mL", "1", "15"}})
	hold(t, formulas, []row{{"A113", "18 units/kg/h", "70 kg", "100 units/mL", "0.1", "12.6"}})
	hold(t, handOut, []row{{"A119", "1 mg/h", "", "50 mg in 1000 mL", "1", "20"}})
}

// TestPrintedWrong holds rows that are wrong in print: the sum must give the
// right figure and not the printed one.
func TestPrintedWrong(t *testing.T) {
	for _, r := range []struct{ row, printed row }{
		// The noradrenaline grid repeats the adrenaline grid, which is half as strong.
		{row{"A046", "0.05 mcg/kg/min", "50 kg", "4 mg in 50 mL", "0.001", "1.875"}, row{rate: "3.8"}},
		{row{"A047", "0.1 mcg/kg/min", "70 kg", "4 mg in 50 mL", "0.001", "5.25"}, row{rate: "10.5"}},
		{row{"A048", "0.25 mcg/kg/min", "80 kg", "4 mg in 50 mL", "0.001", "15"}, row{rate: "30"}},
		// Multiples of a rounded base rate were carried forward.
		{row{"A099", "2 mcg/kg/min", "70 kg", "2.5 mg/mL", "0.01", "3.36"}, row{rate: "3.2"}},
		// Other figures than the question's were put into the working.
		{row{"A103", "3 mcg/kg/min", "86 kg", "800 mg in 500 mL", "0.001", "9.675"}, row{rate: "7.97"}},
	} {
		hold(t, "recomputed from the published inputs", []row{r.row})
		if r.row.rate == r.printed.rate {
			t.Errorf("%s: the printed figure %s is expected", r.row.id, r.printed.rate)
		}
	}
}

// TestPerKilogramTable holds rates in mL/kg/min: the flow of 1 kg in an hour,
// divided by 60.
func TestPerKilogramTable(t *testing.T) {
	for _, c := range []struct{ id, dose, conc, want string }{
		{"A021", "2.5 mcg/kg/min", "250 mcg/mL", "0.01"},
		{"A022", "2.5 mcg/kg/min", "1000 mcg/mL", "0.0025"},
		{"A023", "5 mcg/kg/min", "500 mcg/mL", "0.01"},
		{"A024", "7.5 mcg/kg/min", "250 mcg/mL", "0.03"},
		{"A025", "7.5 mcg/kg/min", "1000 mcg/mL", "0.0075"},
		{"A026", "10 mcg/kg/min", "500 mcg/mL", "0.02"},
		{"A027", "12.5 mcg/kg/min", "250 mcg/mL", "0.05"},
		{"A028", "12.5 mcg/kg/min", "1000 mcg/mL", "0.0125"},
		{"A029", "15 mcg/kg/min", "500 mcg/mL", "0.03"},
	} {
		f, err := Flow(dose(t, c.dose), by(t, "1 kg"), conc(t, c.conc))
		if err != nil {
			t.Fatal(err)
		}
		if got := f.Scaled(big.NewRat(1, 60)).Exact(); got != c.want {
			t.Errorf("%s: got %s mL/kg/min, want %s (%s)", c.id, got, c.want, dobutamine)
		}
	}
}

// TestReverse goes from published flows back to dose rates.
func TestReverse(t *testing.T) {
	for _, c := range []struct{ id, flow, by, conc, like, want, source string }{
		{"A063", "10", "", "40 mg/L", "1 mg/h", "0.4", noradrenaline},
		{"A064", "5", "", "40 mg/L", "1 mg/h", "0.2", noradrenaline},
		{"A077", "1", "", "3 mcg/mL", "1 mcg/min", "0.05", newborn},
		{"A101", "10", "70 kg", "10 mg/mL", "1 mcg/kg/min", "500/21", familyNotes}, // 23.8; the source rounds to 25
	} {
		d, err := Delivered(step(t, c.flow), by(t, c.by), conc(t, c.conc), dose(t, c.like))
		if err != nil || d.Exact() != c.want {
			t.Errorf("%s: got %s, %v, want %s (%s)", c.id, d.Exact(), err, c.want, c.source)
		}
		if d.Unit().String() != dose(t, c.like).Unit().String() || d.Period() != dose(t, c.like).Period() || d.Basis() != dose(t, c.like).Basis() {
			t.Errorf("%s: got a dose rate in another unit than asked", c.id)
		}
	}
}

// TestRunTime is row A110 read backwards: 750 mL in 6 h is 125 mL/h.
func TestRunTime(t *testing.T) {
	v, err := quantity.ParseVolume("750 mL")
	if err != nil {
		t.Fatal(err)
	}
	if got, err := RunTime(v, step(t, "125")); err != nil || got != 360 {
		t.Errorf("got %d min, %v, want 360 (%s)", got, err, calculation)
	}
	if got, err := RunTime(v, step(t, "125.1")); err != nil || got != 359 {
		t.Errorf("got %d min, %v, want 359: rounded down", got, err)
	}
	var missing *quantity.NotGivenError
	if _, err := RunTime(v, quantity.MillilitresPerHour(new(big.Rat))); !errors.As(err, &missing) {
		t.Errorf("at no flow: got %v, want it refused", err)
	}
}

// TestConstants holds every row of the table of conversion constants, mL/h =
// dose x weight or surface x constant / concentration, for two doses each. The
// constants follow from 60 min in an hour and 1,000 between neighbouring units.
func TestConstants(t *testing.T) {
	for _, c := range []struct {
		unit, conc string
		constant   *big.Rat
	}{
		{"mcg/kg/min", "mcg/mL", big.NewRat(60, 1)},
		{"mcg/kg/min", "mg/mL", big.NewRat(6, 100)},
		{"mcg/kg/h", "mcg/mL", big.NewRat(1, 1)},
		{"mg/kg/h", "mg/mL", big.NewRat(1, 1)},
		{"mg/h", "mg/mL", big.NewRat(1, 1)},
		{"mcg/min", "mcg/mL", big.NewRat(60, 1)},
		{"ng/kg/min", "ng/mL", big.NewRat(60, 1)},
		{"ng/kg/min", "mcg/mL", big.NewRat(6, 100)},
		{"units/kg/h", "units/mL", big.NewRat(1, 1)},
		{"milliunits/min", "units/mL", big.NewRat(6, 100)},
		{"milliunits/kg/min", "units/mL", big.NewRat(6, 100)},
		{"mmol/h", "mmol/mL", big.NewRat(1, 1)},
		{"micromol/kg/min", "mmol/mL", big.NewRat(6, 100)},
		{"mg/m2/h", "mg/mL", big.NewRat(1, 1)},
		{"g/h", "mg/mL", big.NewRat(1000, 1)},
	} {
		per, size := sizeFor(t, dose(t, "1 "+c.unit))
		for _, d := range []string{"0.7", "13"} {
			f, err := Flow(dose(t, d+" "+c.unit), per, conc(t, "0.8 "+c.conc))
			if err != nil {
				t.Errorf("%s at %s: %v", c.unit, c.conc, err)
				continue
			}
			want, _ := new(big.Rat).SetString(d)
			want.Mul(want, size).Mul(want, c.constant).Quo(want, big.NewRat(8, 10))
			if f.Rat().Cmp(want) != 0 {
				t.Errorf("%s %s at 0.8 %s: got %s mL/h, want %s", d, c.unit, c.conc, f.Exact(), want.RatString())
			}
		}
	}
}

// sizeFor is a weight of 72.5 kg or a surface of 1.85 m², as the basis asks.
func sizeFor(t *testing.T, d quantity.DoseRate) (Per, *big.Rat) {
	t.Helper()
	switch d.Basis() {
	case quantity.PerKilogram:
		return by(t, "72.5 kg"), big.NewRat(725, 10)
	case quantity.PerSquareMetre:
		return by(t, "1.85 m2"), big.NewRat(185, 100)
	case quantity.Absolute:
		return by(t, ""), big.NewRat(1, 1)
	}
	t.Fatalf("a dose rate without a basis: %v", d.Basis())
	return Per{}, nil
}
