package recheck

import "testing"

// BenchmarkLabel checks the figures of one plain label; BenchmarkAllPapers those
// of a full infusion with body size, ladder and slips.
func BenchmarkLabel(b *testing.B)     { bench(b, true) }
func BenchmarkAllPapers(b *testing.B) { bench(b, false) }

func bench(b *testing.B, labelOnly bool) {
	s := newTruth(1)
	if labelOnly {
		keep := map[string]bool{ContainerAmount: true, ContainerVolume: true, Method: true, DrugVolume: true, DrugStep: true, DiluentVolume: true, FinalVolume: true, AmountInSyringe: true,
			Concentration: true, Prepared: true, PreparedOffset: true, UseHours: true, UseBy: true, UseByOffset: true, ATC: true, Serial: true, "code.1.text": true}
		var figures []Figure
		for _, f := range s.Figures {
			if keep[f.Name] {
				figures = append(figures, f)
			}
		}
		s.Figures = figures
	}
	b.ReportAllocs()
	for b.Loop() {
		if _, err := Check(s); err != nil {
			b.Fatal(err)
		}
	}
}
