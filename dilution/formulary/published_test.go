package formulary_test

import (
	"testing"

	"drawup/dilution/formulary/published"
)

func tables(t *testing.T) *published.Tables {
	t.Helper()
	x, err := published.Load("../../testdata/formulary")
	if err != nil {
		t.Fatal(err)
	}
	return x
}

func TestPublishedTables(t *testing.T) {
	x := tables(t)
	for _, d := range starter(t).Drugs() {
		for _, f := range x.Check(d) {
			t.Error(f)
		}
	}
	for _, e := range x.Unused() {
		t.Errorf("the excuse %q is not needed", e)
	}
}
