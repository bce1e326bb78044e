package layouts_test

import (
	"testing"

	"drawup/labels"
	"drawup/layouts"
)

// A label with everything that the starter formulary makes it carry (two
// marks, dose, digest) still fits the sheet of 65, striped with the reversal
// line included, and the dose is not what gives way.
func TestDenseLabels(t *testing.T) {
	for _, l := range []labels.Label{
		sample("NMB-R", "Sugammadex", "100 mg/mL", "110 mg", "V03AB35", "100mg/mL"),
		sample("SUX", "Suxamethonium", "50 mg/mL", "150 mg", "M03AB01", "50mg/mL"),
		sample("NMB", "Rocuronium", "10 mg/mL", "22 mg", "M03AC09", "10mg/mL"),
		sample("ACH", "Atropine", "600 micrograms/mL", "282 micrograms", "A03BA01", "600ug/mL"),
		sample("OTH", "Magnesium sulfate", "200 mg/mL", "4 g", "B05XA05", "200mg/mL"),
	} {
		l.Marks = []string{labels.MarkStarter, labels.MarkUnverified}
		l.Digest, l.Dose = "71bff7a2", labels.Words("one dose")
		pages := placed(t, []labels.Label{l}, stock(t, "a4-65"), layouts.Options{})
		l.Digest = "ref " + l.Digest
		checkLabel(t, l, stock(t, "a4-65"), pages[0])
	}
}
