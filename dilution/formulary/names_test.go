package formulary_test

import (
	"path/filepath"
	"regexp"
	"testing"
)

// namesOnly are the drugs that are filed by name, code and class alone: no
// text was found that states a presentation, so nothing of them can be planned.
var namesOnly = []string{"articaine"}

// A drug by name alone holds nothing that could be planned (rule R10).
func TestNamesOnlyHoldNothing(t *testing.T) {
	f := starter(t)
	for _, n := range namesOnly {
		d, _, ok := f.Find(n)
		if !ok {
			t.Errorf("%s is not filed", n)
			continue
		}
		if len(d.Presentations)+len(d.Bounds)+len(d.Doses)+len(d.Rates)+len(d.Standards)+len(d.Stability)+len(d.LocalMaxima) > 0 {
			t.Errorf("%s holds figures; take it out of the drugs by name alone", n)
		}
	}
}

// Each drug of the formulary has one row in the tables of names: a second one,
// elsewhere, would go stale unseen.
func TestOneRowForEachDrug(t *testing.T) {
	f := starter(t)
	rows := map[string]int{}
	files, err := filepath.Glob("../../testdata/formulary/names/*.tsv")
	if err != nil {
		t.Fatal(err)
	}
	for _, file := range files {
		for _, r := range table(t, file, 4) {
			if d, _, ok := f.Find(r[0]); ok {
				rows[d.Name]++
			}
		}
	}
	for _, d := range f.Drugs() {
		if rows[d.Name] != 1 {
			t.Errorf("%s: got %d rows in the tables of names, want one", d.Name, rows[d.Name])
		}
	}
}

// labelRules is the table of 126 drugs of the label rules: INN, code, class.
const labelRules = "label-rules-5-2.tsv"

// ATC codes and label classes against the tables of names: WHO index and
// ISO 26825:2020, see testdata/formulary/README.md. Every drug of the tables is
// filed, all 126 of the label rules among them, and every drug has a row.
func TestCodesAndClasses(t *testing.T) {
	f := starter(t)
	shape := regexp.MustCompile(`^[A-Z]\d{2}[A-Z]{2}\d{2}$`)
	files, err := filepath.Glob("../../testdata/formulary/names/*.tsv")
	if err != nil {
		t.Fatal(err)
	}
	seen := map[string]bool{}
	for _, file := range files {
		list := table(t, file, 4)
		if filepath.Base(file) == labelRules && len(list) != 126 {
			t.Fatalf("got %d drugs in the label rules, want 126", len(list))
		}
		for _, r := range list {
			d, _, ok := f.Find(r[0])
			if r[2] == "OTH" && d.Class == "ACO" {
				r[2] = "ACO" // part 6 of the label rules: white as everything else, teal where a site asks for it
			}
			switch {
			case !ok:
				t.Errorf("%s is in %s and not in the formulary", r[0], file)
			case !shape.MatchString(d.ATC) || d.ATC != r[1] || d.Class != r[2]:
				t.Errorf("%s: got %s, class %s, want %s, class %s", d.Name, d.ATC, d.Class, r[1], r[2])
			}
			seen[d.Name] = true
		}
	}
	for _, d := range f.Drugs() {
		if !seen[d.Name] {
			t.Errorf("%s has no row in the tables of names", d.Name)
		}
	}
}
