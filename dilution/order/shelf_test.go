package order

import (
	"strings"
	"testing"

	"github.com/pelletier/go-toml/v2"

	"drawup/dilution/tomlfile"
)

// The list of known keys and the records are the same.
func TestShelfKeysAreTheRecords(t *testing.T) {
	data, err := toml.Marshal(shelfFile{
		Stock: []stockRecord{{Count: ""}}, Barrels: []barrelRecord{{}}, Fluids: []fluidRecord{{Count: ""}}, Pumps: []pumpRecord{{Takes: []string{}}},
	})
	if err != nil {
		t.Fatal(err)
	}
	var file shelfFile
	places, list := tomlfile.Decode("x", data, &file)
	if list.Refused() {
		t.Fatal(list)
	}
	known := 0
	for _, k := range shelfKeys() {
		var path []any
		for _, part := range strings.Split(k, ".") {
			path = append(path, part)
			if len(path) == 1 && part != "shelf" {
				path = append(path, 0)
			}
		}
		if !places.Has(path...) {
			t.Errorf("the records have no %s", k)
		}
		if strings.Contains(k, ".") {
			known++
		}
	}
	if count := strings.Count(string(data), " = "); count != known {
		t.Errorf("the records have %d keys, the list %d", count, known)
	}
}

// Every value of a shelf comes with its text and place.
func TestReadShelf(t *testing.T) {
	s, list := ReadShelf("shelf.toml", []byte(`[shelf]
name = "cupboard"
invented = true
needle_dead_space = "0.05 mL"
[[stock]]
drug = "ephedrine"
presentation = "ampoule 30 mg in 1 mL"
count = 10
[[stock]]
drug = "fentanyl"
presentation = "ampoule 100 microgram in 2 mL"
[[barrel]]
size = "10 mL"
step = "0.5 mL"
dead_space = "0.1 mL"
[[diluent]]
name = "glucose 5 %"
container = "bag"
volume = "50 mL"
count = "3"
[[pump]]
name = "the pump"
takes = ["20 mL", "50 mL"]
`))
	if len(list) > 0 {
		t.Fatal(list)
	}
	if !s.Invented || s.Name.Value != "cupboard" || s.NeedleDeadSpace.Value.Exact() != "0.05" || s.File != "shelf.toml" {
		t.Errorf("got the head %+v", s)
	}
	if len(s.Stock) != 2 || s.Stock[0].Count.Value != 10 || s.Stock[0].Presentation.Pos.Line != 7 || s.Stock[1].Count.Given() || s.Stock[1].Drug.Value != "fentanyl" {
		t.Errorf("got the stock %+v", s.Stock)
	}
	if b := s.Barrels; len(b) != 1 || b[0].Size.Value.Exact() != "10" || b[0].Step.Value.Exact() != "0.5" || b[0].DeadSpace.Value.Exact() != "0.1" || b[0].Step.Pos.Line != 14 {
		t.Errorf("got the barrels %+v", b)
	}
	if f := s.Fluids; len(f) != 1 || f[0].Name.Value != "glucose 5 %" || f[0].Container.Value != "bag" || f[0].Volume.Value.Exact() != "50" || f[0].Count.Value != 3 {
		t.Errorf("got the fluids %+v", f)
	}
	if p := s.Pumps; len(p) != 1 || p[0].Name.Value != "the pump" || len(p[0].Takes) != 2 || p[0].Takes[1].Value.Exact() != "50" {
		t.Errorf("got the pumps %+v", p)
	}
}

// The keys of the newer targets, each with its place.
func TestReadTargets(t *testing.T) {
	o, list := Read("order.toml", []byte(`[session]
place = "theatre 2"
date = "2026-12-01"
prepared = "07:30"
preparer = "A. Example"
[[patient]]
id = "A"
weight = "70 kg"
[[patient.syringe]]
drug = "morphine"
dose = "2 mg"
doses = 6
concentration = "1 mg/mL"
[[patient.syringe]]
drug = "naloxone"
dose = "10 microgram"
dilute_if_needed = true
[[patient.infusion]]
drug = "noradrenaline"
concentration = "80 microgram/mL"
hours = "12 h"
priming = "2 mL"
dead_space = "0.1 mL"
start = "0.1 microgram/kg/min"
[[patient.infusion]]
drug = "noradrenaline"
mixture = "Rule of three"
one_ml_per_hour = "0.1 microgram/kg/min"
volume = "20 mL"
start = "0.1 microgram/kg/min"
`))
	if len(list) > 0 {
		t.Fatal(list)
	}
	a, b, c, d := o.Syringes[0], o.Syringes[1], o.Syringes[2], o.Syringes[3]
	if a.Doses.Value != 6 || a.Doses.Text != "6" || a.Doses.Pos.Line != 12 || a.Dilute.Given() {
		t.Errorf("doses: got %+v", a.Doses)
	}
	if !b.Dilute.Value || b.Dilute.Pos.Line != 17 || b.Doses.Given() {
		t.Errorf("dilute_if_needed: got %+v", b.Dilute)
	}
	if c.Hours.Value.Hours() != 12 || c.Priming.Value.Exact() != "2" || c.DeadSpace.Value.Exact() != "0.1" || !c.Concentration.Given() {
		t.Errorf("hours: got %+v, %+v, %+v", c.Hours, c.Priming, c.DeadSpace)
	}
	if d.Mixture.Value != RuleOfThree || d.Each.Text != "0.1 microgram/kg/min" || d.Volume.Value.Exact() != "20" {
		t.Errorf("mixture: got %+v, %+v", d.Mixture, d.Each)
	}
}
