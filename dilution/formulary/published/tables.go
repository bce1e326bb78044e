// Package published holds a formulary against the tables of published figures
// in testdata/formulary. Tests alone use it. It reads quantities by a small code
// of its own, so that a fault in the formulary's cannot hide.
package published

import (
	"fmt"
	"os"
	"path/filepath"
	"slices"
	"strings"

	"drawup/dilution/formulary"
)

// A Finding is one disagreement of the formulary with the tables. An excuse of
// its kind and name takes it away.
type Finding struct {
	Kind string // unseen, not shipped, looser, far, longer
	Name string // "propofol, vial 500 mg in 50 mL"
	Text string // what stands against what
}

func (f Finding) String() string { return f.Kind + ": " + f.Name + ": " + f.Text }

// Tables are the published figures and the excuses.
type Tables struct {
	strengths []strength
	limits    map[string][]limit // by drug
	rows      map[string][]row   // by drug
	doses     map[string][]dose  // by drug
	excuses   map[string]string  // kind and name → why
	used      map[string]bool
	count     map[string]int // rows read, by folder
}

// Load reads the tables below folder, testdata/formulary.
func Load(folder string) (*Tables, error) {
	t := &Tables{limits: map[string][]limit{}, rows: map[string][]row{}, doses: map[string][]dose{}, excuses: map[string]string{},
		used: map[string]bool{}, count: map[string]int{}}
	for _, part := range []struct {
		name string
		read func([]string) error
	}{
		{"strengths", t.readStrength}, {"limits", t.readLimit}, {"published", t.readRow}, {"doses", t.readDose}, {"excused", t.readExcuse},
	} {
		if err := t.folder(folder, part.name, part.read); err != nil {
			return nil, err
		}
	}
	return t, nil
}

// folder reads every table of one folder, heads left out.
func (t *Tables) folder(root, name string, read func([]string) error) error {
	files, err := filepath.Glob(filepath.Join(root, name, "*.tsv"))
	if err != nil || len(files) == 0 {
		return fmt.Errorf("no tables in %s/%s (%v)", root, name, err)
	}
	for _, file := range files {
		if filepath.Base(file) == "sources.tsv" {
			continue
		}
		data, err := os.ReadFile(file)
		if err != nil {
			return err
		}
		for i, line := range strings.Split(strings.TrimRight(string(data), "\n"), "\n") {
			if i == 0 {
				continue
			}
			if err := read(strings.Split(line, "\t")); err != nil {
				return fmt.Errorf("%s:%d: %w", file, i+1, err)
			}
			t.count[name]++
		}
	}
	return nil
}

// Rows is how many rows a folder holds.
func (t *Tables) Rows(folder string) int { return t.count[folder] }

// Unfiled is every drug of the tables that the formulary does not file under the
// tables' name and nothing excuses.
func (t *Tables) Unfiled(f *formulary.Formulary) []Finding {
	var names []string
	for name := range t.limits {
		names = append(names, name)
	}
	for name := range t.rows {
		names = append(names, name)
	}
	for name := range t.doses {
		names = append(names, name)
	}
	for _, s := range t.strengths {
		names = append(names, s.drug)
	}
	slices.Sort(names)
	var out []Finding
	for _, name := range slices.Compact(names) {
		if d, _, ok := f.Find(name); !ok || d.Name != name {
			out = append(out, Finding{"not shipped", name, "a drug of the tables is not filed"})
		}
	}
	return t.unexcused(out)
}

// excused are the kinds that belong to these checks; others belong to others.
var excused = []string{"unseen", "not shipped", "looser", "far", "longer"}

func (t *Tables) readExcuse(cells []string) error {
	if len(cells) != 3 || cells[2] == "" {
		return fmt.Errorf("got %d cells, want kind, row and why", len(cells))
	}
	if slices.Contains(excused, cells[0]) {
		t.excuses[cells[0]+"\t"+cells[1]] = cells[2]
	}
	return nil
}

// Check is every disagreement about one drug that nothing excuses.
func (t *Tables) Check(d formulary.Drug) []Finding {
	return t.unexcused(slices.Concat(t.unseen(d), t.far(d), t.missing(d), t.bounds(d), t.rates(d), t.highest(d), t.times(d)))
}

func (t *Tables) unexcused(found []Finding) []Finding {
	slices.SortFunc(found, func(a, b Finding) int { return strings.Compare(a.String(), b.String()) })
	var out []Finding
	for _, f := range found {
		key := f.Kind + "\t" + f.Name
		if t.excuses[key] == "" {
			out = append(out, f)
		}
		t.used[key] = true
	}
	return out
}

// Unused are excuses that nothing has asked for so far.
func (t *Tables) Unused() []string {
	var out []string
	for key := range t.excuses {
		if !t.used[key] {
			out = append(out, strings.Replace(key, "\t", ": ", 1))
		}
	}
	slices.Sort(out)
	return out
}
