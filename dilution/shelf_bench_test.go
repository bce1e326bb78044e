package dilution_test

import (
	"fmt"
	"strings"
	"testing"

	"drawup/dilution"
	"drawup/dilution/formulary"
	"drawup/dilution/order"
)

// inventedFormulary has so many drugs, each of so many strengths in ampoules of
// 2, 5 or more mL. Everything in it is invented, for speed alone.
func inventedFormulary(b testing.TB, drugs, strengths int, volumes ...int) *formulary.Formulary {
	b.Helper()
	var t strings.Builder
	t.WriteString("name = \"invented\"\nversion = \"1\"\n[sources.X]\ntitle = \"invented for a benchmark\"\ngrade = \"A\"\n")
	for d := range drugs {
		fmt.Fprintf(&t, "[[drug]]\nname = \"drug %c%c\"\natc = \"N01AX99\"\nclass = \"IND\"\ncounted = \"mass\"\n", 'a'+d/26, 'a'+d%26)
		for s := range strengths {
			for _, v := range volumes {
				mg := (s + 1) * v
				fmt.Fprintf(&t, "[[drug.presentation]]\nid = \"ampoule %d mg in %d mL\"\ncontainer = \"ampoule\"\nform = \"solution\"\namount = \"%d mg\"\n"+
					"volume = \"%d mL\"\nsource = \"X\"\nuses = [\"bolus\", \"infusion\"]\nneat = true\n"+
					"diluent = [{ name = \"sodium chloride 0.9 %%\", source = \"X\" }]\n", mg, v, mg, v)
			}
		}
		t.WriteString("[[drug.concentration]]\nuse = \"bolus\"\nline = \"any\"\nlow = { value = \"0.001 mg/mL\", source = \"X\" }\n" +
			"high = { value = \"1000 mg/mL\", source = \"X\" }\n[[drug.dose]]\nfor = \"sleep\"\nroutes = [\"IV\"]\nby = \"actual\"\nby_source = \"X\"\n" +
			"usual_low = { value = \"0.0001 mg/kg\", source = \"X\" }\nusual_high = { value = \"5 mg/kg\", source = \"X\" }\n")
	}
	f, faults := formulary.Read(formulary.Text{Name: "invented.toml", Data: []byte(t.String())})
	if faults.Refused() {
		b.Fatal(faults.Refusals()[0])
	}
	return f
}

// shelfOf stocks everything of a formulary, and twelve sizes of syringe.
func shelfOf(b testing.TB, f *formulary.Formulary) order.Shelf {
	b.Helper()
	var t strings.Builder
	for _, d := range f.Drugs() {
		for _, p := range d.Presentations {
			fmt.Fprintf(&t, "[[stock]]\ndrug = %q\npresentation = %q\ncount = 20\n", d.Name, p.ID)
		}
	}
	for _, s := range []string{"0.5 mL in 0.01 mL", "1 mL in 0.01 mL", "2 mL in 0.1 mL", "2.5 mL in 0.1 mL", "3 mL in 0.1 mL", "5 mL in 0.2 mL",
		"6 mL in 0.2 mL", "10 mL in 0.2 mL", "12 mL in 0.5 mL", "20 mL in 1 mL", "30 mL in 1 mL", "50 mL in 1 mL"} {
		size, step, _ := strings.Cut(s, " in ")
		fmt.Fprintf(&t, "[[barrel]]\nsize = %q\nstep = %q\n", size, step)
	}
	t.WriteString("[[diluent]]\nname = \"sodium chloride 0.9 %\"\ncontainer = \"ampoule\"\nvolume = \"10 mL\"\n")
	return shelf(b, t.String())
}

// shelf reads a shelf that must read.
func shelf(b testing.TB, text string) order.Shelf {
	b.Helper()
	s, faults := order.ReadShelf("shelf.toml", []byte(text))
	if faults.Refused() {
		b.Fatalf("shelf refused: %v", faults.Refusals())
	}
	return s
}

func benchShelf(b *testing.B, f *formulary.Formulary, text string, explain bool) {
	s := shelfOf(b, f)
	o, faults := order.Read("order.toml", []byte(session+adult+text))
	if faults.Refused() {
		b.Fatal(faults)
	}
	b.ReportAllocs()
	for b.Loop() {
		if list, reasons := (dilution.Bench{Shelf: &s, Explain: explain}).NewList(o, f, o.Session.Prepared.Value, nil, nil); reasons.Refused() || len(list.Plans) == 0 {
			b.Fatal(reasons)
		}
	}
}

const benchSyringe = "[[patient.syringe]]\ndrug = \"drug ac\"\ndose = \"0.7 mg/kg\"\n"

// One plan from a shelf of 200 presentations (20 drugs, five strengths of two
// sizes) and twelve barrels, the shelf held against the formulary included.
func BenchmarkShelfOf200(b *testing.B) {
	benchShelf(b, inventedFormulary(b, 20, 5, 2, 5), benchSyringe, false)
}

// The same with every alternative kept.
func BenchmarkShelfOf200Explained(b *testing.B) {
	benchShelf(b, inventedFormulary(b, 20, 5, 2, 5), benchSyringe, true)
}

// The worst case: all 200 presentations, forty strengths of five sizes, are of
// the one drug.
func BenchmarkShelfOf200OfOneDrug(b *testing.B) {
	benchShelf(b, inventedFormulary(b, 3, 40, 1, 2, 5, 10, 20), benchSyringe, false)
}

// A list of fifteen syringes from the shelf of 200.
func BenchmarkFifteenFromShelf(b *testing.B) {
	text := ""
	for i := range 15 {
		text += fmt.Sprintf("[[patient.syringe]]\ndrug = \"drug a%c\"\ndose = \"0.%d mg/kg\"\n", 'a'+i, i%5+1)
	}
	benchShelf(b, inventedFormulary(b, 20, 5, 2, 5), text, false)
}

// One amount, neat, from a shelf of two strengths: the plainest plan.
func BenchmarkPlainFromShelf(b *testing.B) {
	benchShelf(b, inventedFormulary(b, 1, 2, 2, 5), "[[patient.syringe]]\ndrug = \"drug aa\"\namount = \"8 mg\"\n", false)
}
