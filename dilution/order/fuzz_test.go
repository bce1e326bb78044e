package order

import (
	"fmt"
	"os"
	"reflect"
	"testing"
)

// Read never panics, says the same twice, explains every refusal, and gives a
// value to every field of an order that it accepts. The seeds are the refused
// orders and one that can be made.
func FuzzRead(f *testing.F) {
	for _, file := range refusedFiles(f) {
		data, err := os.ReadFile(file)
		if err != nil {
			f.Fatal(err)
		}
		f.Add(data)
	}
	f.Add([]byte(whole))
	f.Fuzz(func(t *testing.T, data []byte) {
		a, listA := Read("x", data)
		b, listB := Read("x", data)
		if listA.Error() != listB.Error() {
			t.Fatalf("read twice: got\n%v\nand\n%v", listA, listB)
		}
		for _, r := range listA {
			checkReason(t, r)
			if r.Syringe < 0 || r.Syringe > len(a.Syringes) {
				t.Errorf("a reason concerns syringe %d of %d: %v", r.Syringe, len(a.Syringes), r)
			}
		}
		if !reflect.DeepEqual(a, b) {
			t.Fatalf("read twice: got\n%+v\nand\n%+v", a, b)
		}
		if listA.Refused() {
			return
		}
		if len(a.Syringes) == 0 || a.Session.Prepared.Value.IsZero() {
			t.Fatalf("accepted without a syringe or a time: %+v", a)
		}
		for n, s := range a.Syringes {
			checkValues(t, n, s)
		}
	})
}

// checkValues demands a value wherever there is a text.
func checkValues(t *testing.T, n int, s Syringe) {
	t.Helper()
	for name, ok := range map[string]bool{
		"drug":          s.Drug.Given() && s.Drug.Value != "",
		"number":        s.Number == n+1,
		"dose":          s.Dose.Given() == s.Dose.Value.Given(),
		"dose by":       s.DoseBy.Given() == (s.DoseBy.Value != 0),
		"amount":        s.Amount.Given() == s.Amount.Value.Given(),
		"concentration": s.Concentration.Given() == s.Concentration.Value.Given(),
		"volume":        s.Volume.Given() == s.Volume.Value.Given(),
		"size":          s.Size.Given() == s.Size.Value.Given(),
		"start":         s.Start.Given() == s.Start.Value.Given() && s.Start.Given() == s.Infusion,
		"from":          s.From.Given() == s.From.Value.Given(),
		"to":            s.To.Given() == s.To.Value.Given(),
		"mix":           s.MixAmount.Given() == s.MixVolume.Value.Given() && s.MixAmount.Value.Given() == s.MixVolume.Value.Given(),
		"standard":      !s.Infusion || ways(s) == 1 || ways(s) == 0 && s.Hours.Given(),
		"hours":         s.Hours.Given() == (s.Hours.Value > 0),
		"priming":       s.Priming.Given() == s.Priming.Value.Given(),
		"dead space":    s.DeadSpace.Given() == s.DeadSpace.Value.Given(),
		"each":          s.Each.Given() == s.Each.Value.Given() && (!s.Each.Given() || s.Mixture.Given()),
		"doses":         s.Doses.Given() == (s.Doses.Value > 0) && (!s.Doses.Given() || s.Dose.Given()),
		"expiry":        s.Expiry.Given() != s.Expiry.Value.IsZero(),
		"accepted":      s.AcceptedBy.Given() == s.AcceptedReason.Given(),
	} {
		if !ok {
			t.Errorf("syringe %d was accepted, and its %s is not whole: %s", n+1, name, fmt.Sprintf("%+v", s))
		}
	}
}

// ways counts in how many ways an infusion says what it holds.
func ways(s Syringe) int {
	n := 0
	for _, there := range []bool{s.Standard.Given(), s.MixAmount.Given(), s.Mixture.Given(), s.Concentration.Given()} {
		if there {
			n++
		}
	}
	return n
}
