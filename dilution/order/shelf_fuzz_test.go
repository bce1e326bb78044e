package order

import (
	"os"
	"path/filepath"
	"reflect"
	"testing"
)

// ReadShelf never panics, says the same twice, explains every refusal, and a
// shelf that it accepts has a value wherever it has a text. The seeds are the
// refused shelves and the demonstration.
func FuzzReadShelf(f *testing.F) {
	files, err := filepath.Glob("../../testdata/refused/shelf/*.toml")
	if err != nil || len(files) < 5 {
		f.Fatalf("got %d files (%v)", len(files), err)
	}
	for _, file := range append(files, "../../testdata/shelves/harbour.toml") {
		data, err := os.ReadFile(file)
		if err != nil {
			f.Fatal(err)
		}
		f.Add(data)
	}
	f.Fuzz(func(t *testing.T, data []byte) {
		a, listA := ReadShelf("x", data)
		b, listB := ReadShelf("x", data)
		if listA.Error() != listB.Error() || !reflect.DeepEqual(a, b) {
			t.Fatalf("read twice: got\n%+v, %v\nand\n%+v, %v", a, listA, b, listB)
		}
		for _, r := range listA {
			checkReason(t, r)
		}
		if listA.Refused() {
			return
		}
		if len(a.Stock) == 0 || len(a.Barrels) == 0 {
			t.Fatalf("accepted an empty shelf: %+v", a)
		}
		for _, s := range a.Stock {
			if !s.Drug.Given() || !s.Presentation.Given() || s.Count.Given() && s.Count.Value < 1 {
				t.Errorf("accepted %+v", s)
			}
		}
		for _, b := range a.Barrels {
			if !b.Size.Value.Given() || b.Step.Given() && !b.Step.Value.Given() || b.DeadSpace.Given() && !b.DeadSpace.Value.Given() {
				t.Errorf("accepted %+v", b)
			}
		}
		for _, f := range a.Fluids {
			if !f.Name.Given() || !f.Volume.Value.Given() || !within(Containers(), f.Container.Value) {
				t.Errorf("accepted %+v", f)
			}
		}
		for _, p := range a.Pumps {
			if !p.Name.Given() || len(p.Takes) == 0 {
				t.Errorf("accepted %+v", p)
			}
		}
	})
}
