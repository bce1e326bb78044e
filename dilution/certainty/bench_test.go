package certainty

import "testing"

// BenchmarkTwoSteps works the interval of a dilution in two steps.
func BenchmarkTwoSteps(b *testing.B) {
	step := MakeUpTo(in(b, "10", "10"), in(b, "1", "2"))
	p := Preparation{Strength: conc(b, "10 mg/mL"), Assay: Around(per(b, "10")), Steps: []Step{step, step}}
	b.ReportAllocs()
	for b.Loop() {
		if _, err := Of(p); err != nil {
			b.Fatal(err)
		}
	}
}
