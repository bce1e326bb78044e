package dilution_test

import (
	"strings"
	"testing"

	"drawup/dilution"
	"drawup/dilution/quantity"
)

// TestQuickRun holds totals against invented maxima: 90 mg in a day, 100 mg in
// all, 30 h at the longest. The sums are by hand.
func TestQuickRun(t *testing.T) {
	for _, c := range []struct{ name, rate, time, first, want string }{
		{"4 x 20 is 80", "4 mg/h", "20 h", "", ""},
		{"4 x 23 is 92 in a day", "4 mg/h", "23 h", "", "dose-above-day-maximum"},
		{"3 x 30 is 90, 72 of it in a day", "3 mg/h", "30 h", "", ""},
		{"3 x 31 runs too long", "3 mg/h", "31 h", "", "runs-longer-than-allowed"},
		{"3 x 34 is 102 in all", "3 mg/h", "34 h", "", "dose-above-day-maximum runs-longer-than-allowed"},
		{"20 and 3 x 24 are 92 in a day", "3 mg/h", "24 h", "20 mg", "dose-above-day-maximum"},
		{"15 and 3 x 24 are 87", "3 mg/h", "24 h", "15 mg", ""},
	} {
		q := dilution.Quick{
			Drug: "sleepwell", Infusion: true, Line: "central", Rate: must(t, quantity.ParseDoseRate, c.rate), Style: quantity.UK(),
			Run: &dilution.QuickRun{Time: must(t, quantity.ParseDuration, c.time), First: must(t, quantity.ParseDose, c.first)},
		}
		list, _ := q.Check(invented(t))
		var got []string
		for _, code := range list.Codes() {
			got = append(got, string(code))
		}
		if strings.Join(got, " ") != c.want {
			t.Errorf("%s: got %v, want %q\n%v", c.name, got, c.want, list)
		}
	}
}
