package recheck

import (
	"fmt"
	"strings"
	"testing"
)

// Values before rounding on published sums. Source key LBL-CISA (US prescribing
// information, cisatracurium, 2.6): 1.5 microgram/kg/min at 45 kg is 40.5 mL/h at
// 0.1 mg/mL, printed there as 41, and 10.125 mL/h at 0.4 mg/mL, printed as 10.1.
// Source key AWM: dobutamine 2 microgram/kg/min at 70 kg, 2.5 mg/mL: 3.36 mL/h.
func TestFlowBeforeRounding(t *testing.T) {
	rows := []struct {
		amount, conc, weight, dose, step, rate, flow, moved string
		wrong                                               []string
	}{
		{"10 mg", "0.1 mg/mL", "45 kg", "1.5 micrograms/kg/min", "1 mL/h", "41 mL/h", "40.5 mL/h", "1.23 % more", []string{"1.23 % less", "1.235 % more", "1.2 % more", "0.5 % more", "nothing", "1.22 % more", "1.23 more", "1.23 %", "+1.23 % more", "1.23 %  more"}},
		{"40 mg", "0.4 mg/mL", "45 kg", "1.5 micrograms/kg/min", "0.1 mL/h", "10.1 mL/h", "10.1 mL/h", "0.247 % less", []string{"0.247 % more", "0.25 % less", "0 % less", "nothing"}},
		{"250 mg", "2.5 mg/mL", "70 kg", "2 micrograms/kg/min", "0.1 mL/h", "3.4 mL/h", "3.36 mL/h", "1.19 % more", []string{"1.18 % more", "1.2 % more"}},
		{"10 mg", "0.1 mg/mL", "70 kg", "1 micrograms/kg/min", "1 mL/h", "42 mL/h", "42 mL/h", "nothing", []string{"0 % more", "0 % less", "Nothing", "", "none", "0.01 % more"}},
	}
	for _, r := range rows {
		s := rated(t, r.amount, "100 mL", "90 mL", r.conc, r.weight, r.dose, r.step, r.rate)
		s.Figures = append(s.Figures, Figure{"pump card", StartFlow, r.flow}, Figure{"pump card", StartMoved, r.moved})
		agrees(t, r.rate+" from "+r.flow, s)
		for _, w := range r.wrong {
			disagreesAt(t, r.rate+" "+w, s.with(StartMoved, w), StartMoved)
		}
		for _, w := range []string{r.rate + "/h", "1 mL/h", strings.TrimSuffix(r.flow, "/h"), strings.Replace(r.flow, "/h", "/min", 1)} {
			disagreesAt(t, r.flow+" "+w, s.with(StartFlow, w), StartFlow)
		}
		disagreesAt(t, "no rate", s.without(StartRate), StartMoved)
	}
}

// Volumes and flow rates that two decimals hold are exact, whatever stands
// before the point; others, and other kinds, keep to the short rule. Worked by
// hand from the printing rule.
func TestVolumesOfManyDigits(t *testing.T) {
	rows := []struct {
		num, den    int64
		unit, right string
		wrong       []string
	}{
		{22968, 10, "mL/h", "2,296.8", []string{"2,297", "2,296", "2,300"}},
		{1234567, 100, "mL", "12,345.67", []string{"12,346", "12,345.7"}},
		{31416, 100, "mL", "314.16", []string{"314", "314.2"}},
		{314159, 1000, "mL", "314", []string{"314.16", "314.159"}},
		{2344, 1000, "mL", "2.344", []string{"2.34"}},
		{1, 3, "mL", "0.333", []string{"0.33"}},
		{31416, 100, "mg", "314", []string{"314.16"}},
		{31416, 100, "mL/min", "314", []string{"314.16"}},
		{31416, 100, "L", "314", []string{"314.16"}},
		{0, 1, "mL", "0", []string{"0.01"}},
	}
	for _, r := range rows {
		unit, err := compound(r.unit, printedUnit)
		if err != nil {
			t.Fatal(err)
		}
		truth := pair(r.num, r.den).times(unit)
		for i, text := range append([]string{r.right}, r.wrong...) {
			read, err := readPrinted(text + " " + r.unit)
			if err != nil {
				if i > 0 {
					continue
				}
				t.Fatal(text, err)
			}
			if got := short(read, truth); (got == nil) != (i == 0) {
				t.Errorf("%d/%d %s: %s gives %v", r.num, r.den, r.unit, text, got)
			}
		}
	}
}

// The volume before it was brought to a graduation, for each way in which an
// order says how much drug to draw. Invented; worked by hand at 10 mg in 4 mL.
func TestDrugBeforeRounding(t *testing.T) {
	build := func(asked, method, drug, diluent, final, wanted, moved string) Stated {
		lines := fmt.Sprintf("container.amount = 10 mg\ncontainer.volume = 4 mL\nmethod = %s\ndrug.volume = %s\ndrug.step = 0.2 mL\nfinal.volume = %s\ndrug.wanted = %s\ndrug.moved = %s", method, drug, final, wanted, moved)
		if diluent != "" {
			lines += "\ndiluent.volume = " + diluent
		}
		return stated(t, "amount = \"10 mg\"\nvolume = \"4 mL\"\n", "method = "+method+"\ndrug.step = 0.2 mL\n"+asked, lines)
	}
	rows := []struct{ what, asked, method, drug, diluent, final, wanted, moved string }{
		// 8.9 mg / 2.5 mg/mL = 3.56 mL; 0.04 / 3.56 = 1.1236 %.
		{"amount", "amount = 8.9 mg", makeUpTo, "3.6 mL", "16.4 mL", "20 mL", "3.56 mL", "1.12 % more"},
		// 0.43 mg/mL x 20 mL / 2.5 mg/mL = 3.44 mL; 0.04 / 3.44 = 1.1628 %.
		{"concentration", "concentration = 0.43 mg/mL", makeUpTo, "3.4 mL", "16.6 mL", "20 mL", "3.44 mL", "1.16 % less"},
		// d (2.5 - 0.4) = 0.4 x 16: 3.047619 mL; less 3 mL: 1.5625 %.
		{"concentration added to a bag", "concentration = 0.4 mg/mL", addTo, "3 mL", "16 mL", "19 mL", "3.05 mL", "1.56 % less"},
		{"drawn volume", "drug.volume = 3.4 mL", makeUpTo, "3.4 mL", "16.6 mL", "20 mL", "3.4 mL", "nothing"},
		{"neat", "final.volume = 3.4 mL", neat, "3.4 mL", "", "3.4 mL", "3.4 mL", "nothing"},
	}
	for _, r := range rows {
		s := build(r.asked, r.method, r.drug, r.diluent, r.final, r.wanted, r.moved)
		if strings.HasPrefix(r.what, "concentration added") {
			// 1.5625 needs five digits, so three are printed.
			disagreesAt(t, r.what, s.with(DrugMoved, "1.5625 % less"), DrugMoved)
		}
		agrees(t, r.what, s)
		for _, f := range []Figure{{"", DrugWanted, r.wanted}, {"", DrugMoved, r.moved}} {
			for _, text := range alterations(f.Name, f.Text) {
				if _, err := Check(s.with(f.Name, text)); err == nil && !sameFigure(f.Name+": "+f.Text+" -> "+text) {
					t.Errorf("%s: passed: %s -> %s", r.what, f.Text, text)
				}
			}
		}
	}
	none := build("", makeUpTo, "3.4 mL", "16.6 mL", "20 mL", "3.4 mL", "nothing")
	disagreesAt(t, "nothing asked", none, DrugWanted, DrugMoved, DrugVolume)
}

// A dose before it was brought to a graduation, and whole ampoules. Invented: a
// dose of 7.3 mg at 2.5 mg/mL is 2.92 mL; drawn 3 mL: 0.08 / 2.92 = 2.7397 %.
func TestDoseBeforeRounding(t *testing.T) {
	s := stated(t, "amount = \"10 mg\"\nvolume = \"4 mL\"\n", "dose = 7.3 mg\ndrug.step = 0.2 mL\ndose.step = 0.2 mL",
		`container.amount = 10 mg
container.volume = 4 mL
method = neat
drug.volume = 3 mL
drug.step = 0.2 mL
final.volume = 3 mL
dose = 7.3 mg
dose.weight.by = none
dose.amount = 7.3 mg
dose.step = 0.2 mL
dose.volume = 3 mL
drug.wanted = 2.92 mL
drug.moved = 2.74 % more
dose.wanted = 2.92 mL
dose.moved = 2.74 % more`)
	agrees(t, "a dose alone", s)
	for _, name := range []string{DoseWanted, DrugWanted} {
		disagreesAt(t, "one digit", s.with(name, "2.93 mL"), name)
	}
	for _, name := range []string{DoseMoved, DrugMoved} {
		disagreesAt(t, "of the rounded volume", s.with(name, "2.67 % more"), name)
	}
	w := wholeAmpoule(t)
	w.Figures = append(w.Figures, Figure{"draw-up", DrugWanted, "10 mL"}, Figure{"draw-up", DrugMoved, "nothing"})
	agrees(t, "whole ampoules", w)
}

// Weights before rounding. Source key CLINPK (unit tests of a published package):
// ideal weight, man, 180 cm, by Devine 74.99 kg: 50 + 2.3 (180/2.54 - 60) =
// 74.9921; adjusted at 80 kg: 74.9921 + 0.4 x 5.0079 = 76.9953; lean by
// Janmahasatian, man, 80 kg, 150 cm: 741,600 / (6680 + 216 x 35.5556) =
// 741,600 / 14,360 = 51.6435.
func TestWeightsBeforeRounding(t *testing.T) {
	rows := []struct {
		height, name, right string
		wrong               []string
	}{
		{"180", IdealFull, "74.9921 kg", []string{"75 kg", "74.992 kg", "74.9922 kg", "74.99213 kg"}},
		{"180", AdjustedFull, "76.9953 kg", []string{"77 kg", "76.9952 kg", "76.99528 kg"}},
		{"150", LeanFull, "51.6435 kg", []string{"51.6 kg", "51.643 kg", "51.6434 kg", "51.64 kg"}},
	}
	for _, r := range rows {
		s := stated(t, "", "sex = male\nweight.actual = 80 kg\nheight = "+r.height+" cm",
			"sex = male\nweight.actual = 80 kg\nheight = "+r.height+" cm\n"+r.name+" = "+r.right)
		agrees(t, r.name, s)
		for _, w := range r.wrong {
			disagreesAt(t, r.name+" "+w, s.with(r.name, w), r.name)
		}
		disagreesAt(t, r.name, s.without(Sex), r.name)
	}
}
