package layouts_test

import (
	"testing"

	"drawup/layouts"
)

// BenchmarkLabels places one label of every class on a sheet.
func BenchmarkLabels(b *testing.B) {
	list, s := samples(), stock(b, "a4-65")
	for b.Loop() {
		if _, refused := layouts.Labels(list, s, make([]allPassed, len(list)), layouts.Options{}); refused.Refused() {
			b.Fatal(refused)
		}
	}
	b.ReportMetric(float64(len(list)*b.N)/b.Elapsed().Seconds(), "labels/s")
}
