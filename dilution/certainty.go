package dilution

import (
	"fmt"
	"math/big"
	"time"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/dilution/syringe"
)

func one() *big.Rat { return big.NewRat(1, 1) }

// assumedAssay is the half width used where the record has no assay limits:
// the wider of the two common pharmacopoeia ranges (calculation.md part d).
const assumedAssay = "10 %"

// certainty states the interval in which the true concentration lies (R9).
func (w *work) certainty() bool {
	m := &w.plan.Mixture
	var err error
	if m.Assay, m.AssayAssumed, err = AssayOf(w.plan.Presentation); err != nil {
		return w.fault(err, "assay", w.o.Pos)
	}
	parts := []quantity.Percent{m.Assay}
	if m.Method != Neat {
		parts = append(parts, m.DrugReading.Relative())
		if !m.InBag {
			parts = append(parts, relative(m.FinalBarrel, m.FinalVolume))
		}
	}
	if m.Interval, err = syringe.Interval(parts...); err != nil {
		return w.fault(err, "interval", w.o.Pos)
	}
	share := new(big.Rat).Quo(m.Interval.Rat(), big.NewRat(100, 1))
	m.Low = m.Concentration.Scaled(new(big.Rat).Sub(one(), share))
	m.High = m.Concentration.Scaled(new(big.Rat).Add(one(), share))
	return true
}

// relative is the tolerance of reading v in barrel b, in per cent of v.
func relative(b syringe.Barrel, v quantity.Volume) quantity.Percent {
	rel := new(big.Rat).Quo(b.Tolerance(v).Rat(), v.Rat())
	return quantity.PerCent(rel.Mul(rel, big.NewRat(100, 1)))
}

// useBy is the earliest of site policy, stability and expiry (R18). Hours are
// absolute.
func (w *work) useBy() bool {
	policy := w.site.bolus
	if w.o.Infusion {
		policy = w.site.infusion
	}
	best := UseBy{Minutes: policy.minutes, Won: "site policy", Source: policy.source}
	known := false
	for _, s := range w.plan.Drug.Stability {
		if s.Storage != "room" || !w.stabilityFits(s) {
			continue
		}
		known = true
		if s.Minutes < best.Minutes {
			best = UseBy{
				Minutes: s.Minutes, Won: "stability, " + s.Diluent + ", at room temperature",
				Source: s.Source.Title,
			}
		}
	}
	best.Stability = known
	best.At = w.plan.Prepared.Add(time.Duration(best.Minutes) * time.Minute)
	best = shownOnce(best)
	if !w.o.Expiry.Given() {
		w.plan.UseBy = best
		return true
	}
	return w.expiry(best)
}

// shownOnce moves a use-by time that the clock shows twice, when the clocks go
// back, to the last minute before: a label cannot say which of the two is meant.
func shownOnce(u UseBy) UseBy {
	const wall = "2006-01-02 15:04"
	twice := func(t time.Time) bool {
		return t.Format(wall) == t.Add(time.Hour).Format(wall) || t.Format(wall) == t.Add(-time.Hour).Format(wall)
	}
	for n := 0; n < 121 && u.Minutes > 1 && twice(u.At); n++ {
		u.At, u.Minutes = u.At.Add(-time.Minute), u.Minutes-1
	}
	return u
}

// expiry lets the container's own expiry date win when it is earlier. A date
// holds until the end of that day.
func (w *work) expiry(best UseBy) bool {
	end := w.o.Expiry.Value
	if !end.After(w.plan.Prepared) {
		return w.refuse(refusal.Reason{
			Code: refusal.ExpiredPresentation, Field: "expiry",
			Got: w.o.Expiry.Text, Want: "a date after " + w.plan.Prepared.Format("2006-01-02"),
			Rule: "R18", Pos: w.o.Expiry.Pos,
			Message: "the container is past its expiry date",
			Remedy:  "discard it and take another",
		})
	}
	if left := int64(end.Sub(w.plan.Prepared) / time.Minute); left < best.Minutes {
		best = UseBy{At: end, Minutes: left, Won: "expiry of the container", Source: "the order"}
	}
	w.plan.UseBy = best
	return true
}

// lasts cautions when an infusion at its start rate outlives its use-by time.
func (w *work) lasts() bool {
	part := w.plan.Infusion
	if part == nil || part.Minutes <= w.plan.UseBy.Minutes {
		return true
	}
	return w.caution(refusal.Reason{
		Code: refusal.RunsPastUseBy, Rule: "R18",
		Field: "start", Got: fmt.Sprintf("%d h", part.Minutes/60),
		Want: fmt.Sprintf("%d h", w.plan.UseBy.Minutes/60), Pos: w.o.Start.Pos,
		Message: "at the start rate it would still be running after its use-by time",
		Remedy:  "change it at the use-by time, empty or not",
	})
}

// stabilityFits reports whether a row is for this fluid, this container and
// this concentration. A row that was shown for other concentrations only says
// nothing of this one.
func (w *work) stabilityFits(s formulary.Stability) bool {
	m := w.plan.Mixture
	if s.Diluent != "any" && s.Diluent != w.fluid() {
		return false
	}
	if s.Container != "" && (s.Container == "bag") != m.InBag {
		return false
	}
	low, lowErr := m.Concentration.Cmp(s.Low.Value)
	high, highErr := m.Concentration.Cmp(s.High.Value)
	return !(s.Low.Given() && (lowErr != nil || low < 0) || s.High.Given() && (highErr != nil || high > 0))
}

// fluid is what the stability rows call this preparation.
func (w *work) fluid() string {
	if w.plan.Mixture.Method == Neat {
		return "neat"
	}
	return w.plan.Mixture.Diluent
}
