package twostep

import (
	"testing"

	"drawup/dilution/syringe"
)

// Benchmarks of the search: the stocked barrels, twelve barrels, and targets
// that are met exactly, that are not, and that no preparation comes near.

func BenchmarkStocked(b *testing.B) { search1(b, wanted(b, "100 units/mL", "0.1 units/mL", "50")) }

func BenchmarkNotExact(b *testing.B) {
	search1(b, wanted(b, "50 microgram/mL", "0.37 microgram/mL", "20"))
}

func BenchmarkTwelveBarrels(b *testing.B) {
	w := wanted(b, "10 mg/mL", "0.013 mg/mL", "20")
	w.Barrels = append(syringe.Known(), barrelOf(b, "2.5", "0.1"), barrelOf(b, "6", "0.2"), barrelOf(b, "12", "0.5"), barrelOf(b, "60", "1"))
	search1(b, w)
}

func BenchmarkFineGraduations(b *testing.B) {
	w := wanted(b, "10 mg/mL", "0.013 mg/mL", "20")
	w.Barrels = append(syringe.Stocked(), barrelOf(b, "10", "0.02"))
	search1(b, w)
}

func search1(b *testing.B, w Wanted) {
	b.ReportAllocs()
	var f Found
	for b.Loop() {
		var err error
		if f, err = Find(w); err != nil {
			b.Fatal(err)
		}
	}
	b.ReportMetric(float64(f.Weighed), "weighed/op")
}
