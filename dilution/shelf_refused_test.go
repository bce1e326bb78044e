package dilution_test

import (
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"drawup/dilution"
	"drawup/dilution/order"
)

// Every fault of a shelf is told on its line, and nothing else is: what the
// reader refuses, and what does not agree with the formulary or with the standard
// for syringes.
func TestRefusedShelves(t *testing.T) {
	files, err := filepath.Glob("../testdata/refused/shelf/*.toml")
	if err != nil || len(files) < 5 {
		t.Fatalf("got %d files (%v)", len(files), err)
	}
	f := starter(t)
	for _, file := range files {
		t.Run(filepath.Base(file), func(t *testing.T) {
			data, err := os.ReadFile(file)
			if err != nil {
				t.Fatal(err)
			}
			s, list := order.ReadShelf("shelf.toml", data)
			if !list.Refused() {
				_, list = bench{dilution.Bench{Shelf: &s}}.plan(t, f, session+adult+"[[patient.syringe]]\n"+lines(key("drug", "suxamethonium"), key("dose", "1 mg/kg")))
			}
			want := marks(string(data), "want")
			if got := placed(list.Refusals()); !slices.Equal(got, want) || len(want) == 0 {
				t.Errorf("got\n%s\nwant\n%s\nreasons\n%v", strings.Join(got, "\n"), strings.Join(want, "\n"), list)
			}
			for _, r := range list {
				checkReason(t, r)
			}
		})
	}
}

// The demonstration shelf uses every key.
func TestShippedShelf(t *testing.T) {
	data, err := os.ReadFile("../testdata/shelves/harbour.toml")
	if err != nil {
		t.Fatal(err)
	}
	s := shelf(t, string(data))
	if !s.Invented || !s.Name.Given() || !s.NeedleDeadSpace.Given() || len(s.Stock) < 8 || len(s.Barrels) < 6 || len(s.Fluids) < 3 || len(s.Pumps) != 1 {
		t.Errorf("got %+v", s)
	}
}
