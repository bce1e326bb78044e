package recheck

import (
	"strings"
	"testing"
)

// packed is invented: 68 mg of 10 mg/mL are 6.8 mL, of one container of 5 mL and
// one of 2 mL; 0.2 mL, 2 mg, are left. 68 mg in 50 mL are 1.36 mg/mL.
func packed(t testing.TB) Stated {
	t.Helper()
	s := stated(t, "", "method = make up to\namount = 68 mg\nfinal.volume = 50 mL\ndrug.step = 0.2 mL", `container.amount = 50 mg
container.volume = 5 mL
container.count = 2
strength = 10 mg/mL
pack.1.presentation = ampoule 50 mg in 5 mL
pack.1.amount = 50 mg
pack.1.volume = 5 mL
pack.1.count = 1
pack.2.presentation = ampoule 20 mg in 2 mL
pack.2.amount = 20 mg
pack.2.volume = 2 mL
pack.2.count = 1
left.volume = 0.2 mL
left.amount = 2 mg
method = make up to
drug.volume = 6.8 mL
drug.step = 0.2 mL
diluent.volume = 43.2 mL
final.volume = 50 mL
amount = 68 mg
concentration = 1.36 mg/mL`)
	s.Presentation = "ampoule 50 mg in 5 mL"
	s.Record = []byte(`[[drug]]
name = "invented"
[[drug.presentation]]
id = "ampoule 20 mg in 2 mL"
amount = "20 mg"
volume = "2 mL"
[[drug.presentation]]
id = "ampoule 50 mg in 5 mL"
amount = "50 mg"
volume = "5 mL"
[[drug.presentation]]
id = "ampoule 5 mg in 5 mL"
amount = "5 mg"
volume = "5 mL"
[[drug.presentation]]
id = "vial 100 mg"
amount = "100 mg"
add = "9.4 mL"
displacement = "0.6 mL"
[[drug.presentation]]
id = "twice"
amount = "20 mg"
amount = "20 mg"
volume = "2 mL"
`)
	return s
}

func TestPacks(t *testing.T) {
	s := packed(t)
	agrees(t, "two sizes", s)
	for _, r := range []struct{ what, name, text, at string }{
		{"a size of another strength", "pack.2.presentation", "ampoule 5 mg in 5 mL", "pack.2.amount"},
		{"the first size twice", "pack.2.presentation", "ampoule 50 mg in 5 mL", "pack.2.presentation"},
		{"a first size that is not the container", "pack.1.presentation", "ampoule 20 mg in 2 mL", "pack.1.presentation"},
		{"no such size", "pack.2.presentation", "ampoule 20 mg in 1 mL", "pack.2.presentation"},
		{"a size with a line twice", "pack.2.presentation", "twice", "pack.2.presentation"},
		{"no containers of a size", "pack.2.count", "0", "pack.2.count"},
		{"half a container", "pack.2.count", "0.5", "pack.2.count"},
		{"counts that do not add up", ContainerCount, "3", ContainerCount},
	} {
		disagreesAt(t, r.what, s.with(r.name, r.text), r.at)
	}
}

// Two of 5 mL and one of 2 mL hold 12 mL: one of 5 mL less would do. One of each
// does not hold 7.2 mL.
func TestPacksNeitherFewNorMany(t *testing.T) {
	s := packed(t)
	many := s.with("pack.1.count", "2").with(ContainerCount, "3").with(LeftVolume, "5.2 mL").with(LeftAmount, "52 mg")
	if d := disagreesAt(t, "one too many", many, "pack.1.count", "pack.2.count"); len(d.Faults) != 2 {
		t.Errorf("got %v, want two faults", d)
	}
	many.Asked = append(many.Asked, Figure{"order", ContainerCount, "3"})
	agrees(t, "so many were asked", many)
	few := s.with(DrugVolume, "7.2 mL").with(DiluentVolume, "42.8 mL").with(AmountInSyringe, "72 mg").with(Concentration, "1.44 mg/mL")
	few.Asked = list(t, "order", "method = make up to\namount = 72 mg\nfinal.volume = 50 mL\ndrug.step = 0.2 mL")
	disagreesAt(t, "too few", few, "pack.1.count", "pack.2.count", LeftVolume)
}

// A vial of powder whose 9.4 mL and 0.6 mL are 10 mL, 10 mg/mL, is such a size.
func TestPackOfPowder(t *testing.T) {
	s := packed(t)
	vial := s.with("pack.2.presentation", "vial 100 mg").with("pack.2.amount", "100 mg").with("pack.2.volume", "10 mL").
		with("pack.1.count", "1").with(DrugVolume, "14.8 mL").with(DiluentVolume, "35.2 mL").with(AmountInSyringe, "148 mg").with(Concentration, "2.96 mg/mL")
	vial.Asked = list(t, "order", "method = make up to\namount = 148 mg\nfinal.volume = 50 mL\ndrug.step = 0.2 mL")
	agrees(t, "powder", vial)
	disagreesAt(t, "displacement forgotten", vial.with("pack.2.volume", "9.4 mL"), "pack.2.volume")
	dry := vial
	dry.Record = []byte(strings.Replace(string(vial.Record), "displacement = \"0.6 mL\"\n", "", 1))
	disagreesAt(t, "no displacement in the record", dry, "pack.2.volume")
}

// Rows without a gap, each with all its columns.
func TestPacksWhole(t *testing.T) {
	s := packed(t)
	for name, faults := range map[string][]string{
		"pack.2.presentation": {"pack.2.amount", "pack.2.volume"},
		"pack.2.amount":       {"pack.2.presentation", "pack.2.volume"},
		"pack.2.volume":       {"pack.2.presentation", "pack.2.amount", LeftVolume},
		"pack.2.count":        {"pack.2.presentation", ContainerCount, LeftVolume},
		ContainerCount:        {"pack.1.count", "pack.2.count"},
	} {
		disagreesAt(t, "without "+name, s.without(name), faults...)
	}
	gap := s
	gap.Figures = append([]Figure{}, s.Figures...)
	for i := range gap.Figures {
		gap.Figures[i].Name = strings.Replace(gap.Figures[i].Name, "pack.2.", "pack.3.", 1)
	}
	disagreesAt(t, "1 and 3", gap, ContainerCount, LeftVolume)
	odd := s
	odd.Figures = append(append([]Figure{}, s.Figures...), Figure{"draw-up", "pack.2.colour", "blue"})
	disagreesAt(t, "an unknown column", odd, "pack.2.colour")
}
