package recheck

import (
	"testing"
)

// Three hundred true plans, worked by the plain fractions of truth_test.go, agree.
func TestTruePlansAgree(t *testing.T) {
	for seed := int64(1); seed <= 300; seed++ {
		s := newTruth(seed)
		if _, err := Check(s); err != nil {
			t.Fatalf("seed %d: %v\nasked %v\nrecord %s\nfigures %v", seed, err, s.Asked, s.Record, s.Figures)
		}
	}
}
