package recheck

import (
	"fmt"
	"testing"
)

// Source: ISO 7886-1:1993, table 1, graduated capacity; the 1 mL rule and the
// case of 4 mL in a 10 mL barrel (0.19 mL, 4.75 %) as worked in key SMTL, the
// other rows from the same formula (calculation notes, table of part c1).
func TestReadingTolerance(t *testing.T) {
	rows := []struct {
		barrel, read string
		num, den     int64 // tolerance in mL
	}{
		{"1 mL", "0.1 mL", 17, 1000}, {"1 mL", "0.2 mL", 19, 1000}, {"1 mL", "0.5 mL", 25, 1000},
		{"2 mL", "0.2 mL", 34, 1000}, {"2 mL", "1 mL", 50, 1000},
		{"5 mL", "1 mL", 85, 1000}, {"5 mL", "2.5 mL", 100, 1000},
		{"10 mL", "1 mL", 160, 1000}, {"10 mL", "4 mL", 190, 1000}, {"10 mL", "5 mL", 200, 1000},
		{"20 mL", "2 mL", 320, 1000}, {"50 mL", "5 mL", 800, 1000}, {"50 mL", "25 mL", 1, 1}, {"50 mL", "50 mL", 2, 1},
	}
	for _, r := range rows {
		barrel, err := readPrinted(r.barrel)
		if err != nil {
			t.Fatal(err)
		}
		read, err := readPrinted(r.read)
		if err != nil {
			t.Fatal(err)
		}
		got := readingTolerance(read.whole, barrel.whole)
		if got.lack != "" || got.times(read.whole.bare(one(inVolume))).against(pair(r.num, r.den)) != 0 {
			t.Errorf("%s in %s: got %s of it, want %d/%d mL", r.read, r.barrel, decimal(got, 6), r.num, r.den)
		}
	}
	over := readingTolerance(whole(6).ofKind(one(inVolume)), whole(5).ofKind(one(inVolume)))
	if over.lack == "" {
		t.Error("6 mL read in a 5 mL barrel has a tolerance")
	}
}

// Source: calculation notes, part g, after GUM (ISO/IEC Guide 98-3): 1 mL in a
// 2 mL barrel (5 %) made up to 10 mL in a 10 mL barrel (4 %), ampoule 5 %: u =
// 4.69 %, U = 9.4 %. Without the final reading U = 2 sqrt(50/3) = 8.165 %.
func partG(t *testing.T, method, diluent, percent, low, high string) Stated {
	t.Helper()
	return stated(t, "amount = \"100 mg\"\nvolume = \"10 mL\"\nassay = \"5 %\"\n",
		fmt.Sprintf("method = %s\ndrug.volume = 1 mL\ndrug.step = 0.1 mL\ndrug.barrel = 2 mL\nfinal.barrel = 10 mL", method),
		fmt.Sprintf(`container.amount = 100 mg
container.volume = 10 mL
method = %s
drug.volume = 1 mL
drug.step = 0.1 mL
diluent.volume = %s
final.volume = 10 mL
concentration = 1 mg/mL
assay = 5 %%
drug.barrel = 2 mL
final.barrel = 10 mL
interval.percent = %s
interval.low = %s
interval.high = %s`, method, diluent, percent, low, high))
}

func TestInterval(t *testing.T) {
	build := func(method, diluent, percent, low, high string) Stated {
		return partG(t, method, diluent, percent, low, high)
	}
	agrees(t, "part g", build("make up to", "9 mL", "9.4 %", "0.906 mg/mL", "1.094 mg/mL"))
	agrees(t, "withdraw, then add", build("withdraw, then add", "9 mL", "8.2 %", "0.918 mg/mL", "1.082 mg/mL"))
	for _, wrong := range []string{"9.3 %", "9.5 %", "14 %", "4.7 %", "94 %", "0.94 %", "9.38 %"} {
		disagreesAt(t, wrong, build("make up to", "9 mL", wrong, "0.906 mg/mL", "1.094 mg/mL"), IntervalPercent)
	}
	s := build("make up to", "9 mL", "9.4 %", "0.906 mg/mL", "1.094 mg/mL")
	disagreesAt(t, "high to three digits though four hold it", s.with(IntervalHigh, "1.09 mg/mL"), IntervalHigh)
	disagreesAt(t, "barrel not stocked", s.with(DrugBarrel, "3 mL"), DrugBarrel)
	disagreesAt(t, "assay not the record's", s.with(Assay, "4 %"), Assay)
	disagreesAt(t, "no assay", s.without(Assay), IntervalPercent)
}

// One component alone is taken at its plain half width, not at 2a/sqrt(3): the
// smaller of the two rules (calculation notes, part g).
func TestNeatIntervalIsTheAssay(t *testing.T) {
	s := stated(t, "amount = \"100 mg\"\nvolume = \"10 mL\"\nassay = \"10 %\"\n", "method = neat\nfinal.volume = 10 mL\ndrug.step = 0.5 mL",
		`container.amount = 100 mg
container.volume = 10 mL
method = neat
drug.volume = 10 mL
drug.step = 0.5 mL
final.volume = 10 mL
concentration = 10 mg/mL
assay = 10 %
drug.barrel = 10 mL
interval.percent = 10 %
interval.low = 9 mg/mL
interval.high = 11 mg/mL`)
	s.Asked = append(s.Asked, Figure{Name: DrugBarrel, Text: "10 mL"})
	agrees(t, "neat", s)
	disagreesAt(t, "2u", s.with(IntervalPercent, "11.5 %"), IntervalPercent)
}

// Graduations as read in key SYR-READ: 1 mL in 0.01, 3 mL in 0.1, 5 mL in 0.2.
func TestBarrelsAndGraduationsPair(t *testing.T) {
	s := stated(t, "amount = \"10 mg\"\nvolume = \"1 mL\"\n",
		"method = neat\nfinal.volume = 0.8 mL\ndrug.barrel = 1 mL\ndrug.step = 0.01 mL\ndrug.barrel = 3 mL\ndrug.step = 0.1 mL\ndrug.barrel = 5 mL\ndrug.step = 0.2 mL",
		`container.amount = 10 mg
container.volume = 1 mL
container.count = 1
method = neat
drug.volume = 0.8 mL
drug.step = 0.1 mL
drug.barrel = 3 mL
final.volume = 0.8 mL
amount = 8 mg`)
	agrees(t, "3 mL in 0.1 mL", s)
	agrees(t, "5 mL in 0.2 mL", s.with(DrugBarrel, "5 mL").with(DrugStep, "0.2 mL"))
	disagreesAt(t, "graduation of another barrel", s.with(DrugStep, "0.2 mL"), DrugStep, DrugBarrel)
	disagreesAt(t, "barrel of another graduation", s.with(DrugBarrel, "1 mL"), DrugStep, DrugBarrel)
	disagreesAt(t, "two containers where one does", s.with(ContainerCount, "2"), ContainerCount)
}

// An order that asks nothing but a dose: the syringe holds that dose. Invented:
// 0.3 mg/kg of 10 mg/mL at 72 kg is 21.6 mg, 2.16 mL, 2.2 mL on 0.1 mL.
func TestNothingButADose(t *testing.T) {
	s := stated(t, "amount = \"50 mg\"\nvolume = \"5 mL\"\n", "dose = 0.3 mg/kg\nweight.actual = 72 kg\ndose.step = 0.1 mL\ndrug.step = 0.1 mL",
		`container.amount = 50 mg
container.volume = 5 mL
method = neat
drug.volume = 2.2 mL
drug.step = 0.1 mL
final.volume = 2.2 mL
amount = 22 mg
concentration = 10 mg/mL
weight.actual = 72 kg
dose = 0.3 mg/kg
dose.weight.by = actual
dose.weight = 72 kg
dose.amount = 21.6 mg
dose.step = 0.1 mL
dose.volume = 2.2 mL
dose.delivered = 22 mg`)
	agrees(t, "dose only", s)
	more := s.with(DrugVolume, "5 mL").with(FinalVolume, "5 mL").with(AmountInSyringe, "50 mg")
	disagreesAt(t, "a whole ampoule though only a dose was asked", more, DrugVolume)
	disagreesAt(t, "a weight that nobody named", s.with(DoseWeightBy, "lean"), DoseWeightBy, DoseWeight)
}
