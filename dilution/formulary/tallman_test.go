package formulary_test

import (
	"strings"
	"testing"
)

// The tall-man list that ships is the regulator's of the US, and only that: the
// forms that the label rules 4.1 give for the drugs of anaesthesia.
func TestTallManList(t *testing.T) {
	f := starter(t)
	if len(f.TallMan) != 1 || f.TallMan[0].Jurisdiction != "US" {
		t.Fatalf("got %d lists, want that of the US", len(f.TallMan))
	}
	list := f.TallMan[0]
	for _, want := range []string{
		"chlorproMAZINE", "dimenhyDRINATE", "diphenhydrAMINE", "DOBUTamine", "DOPamine", "hydrALAZINE", "HYDROmorphone",
		"methylPREDNISolone", "niCARdipine", "traMADol",
	} {
		if got := list.Of(strings.ToLower(want)); got != want {
			t.Errorf("got %q, want %s", got, want)
		}
	}
	// On the lists of others only: these need leave or are not free.
	for _, n := range []string{
		"ephedrine", "epinephrine", "fentanyl", "sufentanil", "bupivacaine", "ropivacaine", "clonidine", "clonazepam", "cefazolin",
		"amiodarone", "lorazepam", "morphine", "metoprolol", "methadone", "physostigmine", "pyridostigmine", "nimodipine",
	} {
		if got := list.Of(n); got != "" {
			t.Errorf("got %q for %s, want nothing: it is not on the list of the US regulator", got, n)
		}
	}
}
