package formulary_test

import (
	"strings"
	"testing"

	"drawup/dilution/formulary"
)

// Whoever knows a drug by its international, US or former British name finds
// the same drug (names: MHRA, pharmaceutical press, ANZCA and WHO, see the
// table). A row none of whose names is filed yet is counted.
func TestSynonymsFindTheDrug(t *testing.T) {
	f := starter(t)
	list := table(t, "../../testdata/formulary/synonyms.tsv", 4)
	if len(list) < 30 {
		t.Fatalf("got %d rows of synonyms", len(list))
	}
	missing := 0
	for _, r := range list {
		names := namesOf(r)
		var found formulary.Drug
		for _, n := range names {
			if d, _, ok := f.Find(n); ok {
				found = d
			}
		}
		if found.Name == "" {
			missing++
			continue
		}
		for _, n := range names {
			if d, _, ok := f.Find(n); !ok || d.Name != found.Name {
				t.Errorf("%q finds %q, want %s", n, d.Name, found.Name)
			}
		}
	}
	t.Logf("%d of %d rows of synonyms have no drug yet", missing, len(list))
}

// namesOf is each name of a row once: INN, US names, other names.
func namesOf(row []string) []string {
	var out []string
	for _, cell := range row[:3] {
		for n := range strings.SplitSeq(cell, "; ") {
			if n != "" {
				out = append(out, n)
			}
		}
	}
	return out
}

// Names that are no synonyms: two different drugs, or two salts of which one is
// over thirty times as strong (label rules 5.1, hyoscine).
func TestLikeNamesStayApart(t *testing.T) {
	f := starter(t)
	for _, c := range [][2]string{
		{"hydralazine", "dihydralazine"}, {"hyoscine butylbromide", "hyoscine hydrobromide"}, {"hyoscine butylbromide", "scopolamine"},
		{"ketamine", "esketamine"}, {"ergometrine", "methylergometrine"}, {"articaine", "articaine with adrenaline"},
		{"neostigmine", "neostigmine with glycopyrronium"}, {"physostigmine", "pyridostigmine"}, {"morphine", "diamorphine"},
	} {
		a, _, ok1 := f.Find(c[0])
		b, _, ok2 := f.Find(c[1])
		if ok1 && ok2 && a.Name == b.Name {
			t.Errorf("%q and %q both find %s", c[0], c[1], a.Name)
		}
	}
}
