package formulary_test

import (
	"testing"

	"drawup/dilution/formulary/published"
)

// Every drug against three sets of published tables (testdata/formulary, with
// the source of each row): containers stand in a document; figures of limits are
// near to those of a second source; and against the second copy no
// concentration, dose rate or time in use is looser than the row's, and each
// container of a row is filed. What disagrees stands in the excuses with why.
func TestAgainstPublishedTables(t *testing.T) {
	tables, err := published.Load("../../testdata/formulary")
	if err != nil {
		t.Fatal(err)
	}
	f := starter(t)
	found := tables.Unfiled(f)
	for _, d := range f.Drugs() {
		found = append(found, tables.Check(d)...)
	}
	for _, x := range found {
		t.Error(x)
	}
	for _, e := range tables.Unused() {
		t.Errorf("the excuse %q is not needed", e)
	}
	for folder, want := range map[string]int{"strengths": 460, "limits": 370, "published": 527} {
		if got := tables.Rows(folder); got < want {
			t.Errorf("got %d rows of %s, want %d or more", got, folder, want)
		}
	}
}
