package body

import (
	"errors"
	"testing"

	"drawup/dilution/quantity"

	"pgregory.net/rapid"
)

// TestNames reads the words that orders and formularies use.
func TestNames(t *testing.T) {
	for word, want := range map[string]Sex{
		"female": Female, "woman": Female, "girl": Female, "f": Female, "F": Female, " Woman ": Female,
		"male": Male, "man": Male, "boy": Male, "m": Male, "": 0, "fm": 0, "x": 0, "0": 0,
	} {
		if got, ok := SexNamed(word); got != want || ok != (want != 0) {
			t.Errorf("sex %q: got %v, %v, want %v", word, got, ok, want)
		}
	}
	for word, want := range map[string]Kind{
		"actual": Actual, "total": Actual, "Ideal": Ideal, "adjusted": Adjusted, "lean": Lean, "surface": Surface, "none": None,
		"": 0, "fat-free": 0, "weight": 0,
	} {
		if got, ok := KindNamed(word); got != want || ok != (want != 0) {
			t.Errorf("kind %q: got %v, %v, want %v", word, got, ok, want)
		}
	}
	for _, k := range []Kind{Actual, Ideal, Adjusted, Lean, Surface, None} {
		if back, ok := KindNamed(k.String()); !ok || back != k {
			t.Errorf("kind %v: got %v back", k, back)
		}
	}
	if Sex(0).String() != "" || Kind(0).String() != "" || (Age{}).String() != "" {
		t.Error("a value that is not given prints something")
	}
}

// TestAge reads ages as written and counts completed years.
func TestAge(t *testing.T) {
	for _, c := range []struct {
		text, printed string
		years         int
	}{
		{"82 years", "82 years", 82},
		{"82 y", "82 years", 82},
		{"82yr", "82 years", 82},
		{" 1 year ", "1 year", 1},
		{"14 months", "14 months", 1},
		{"1 month", "1 month", 0},
		{"215 months", "215 months", 17},
		{"216 months", "216 months", 18},
		{"3 weeks", "3 weeks", 0},
		{"1 day", "1 day", 0},
		{"0 days", "0 days", 0},
		{"365 days", "365 days", 0},
		{"366 days", "366 days", 1},
		{"130 years", "130 years", 130},
	} {
		a, err := ParseAge(c.text)
		if err != nil {
			t.Errorf("%q: %v", c.text, err)
			continue
		}
		if !a.Given() || a.String() != c.printed || a.Years() != c.years || a.Written() != c.text {
			t.Errorf("%q: got %q, %d years, written %q, want %q, %d", c.text, a, a.Years(), a.Written(), c.printed, c.years)
		}
	}
}

// TestAgeRefused refuses what could be read in two ways, with its fault.
func TestAgeRefused(t *testing.T) {
	for text, want := range map[string]quantity.Fault{
		"": quantity.EmptyText, "  ": quantity.EmptyText, "82": quantity.UnknownUnit, "82 yaers": quantity.UnknownUnit,
		"years": quantity.BadNumber, "-3 years": quantity.BadNumber, "1.5 years": quantity.BadNumber, "1,5 years": quantity.BadNumber,
		"1½ years": quantity.BadNumber, "1e1 years": quantity.UnknownUnit, "082 years": quantity.BadNumber, "٣ years": quantity.BadNumber,
		"0 years": quantity.ZeroOrLess, "0 months": quantity.ZeroOrLess, "131 years": quantity.TooManyDigit,
		"1984 years": quantity.TooManyDigit, "99999999999999999999 days": quantity.TooManyDigit, "3 m": quantity.UnknownUnit,
	} {
		var syntax *quantity.SyntaxError
		if a, err := ParseAge(text); !errors.As(err, &syntax) || syntax.Code != want || a.Given() {
			t.Errorf("%q: got %v, %v, want fault %s", text, a, err, want)
		}
	}
}

// TestAgeOrder compares across units by the calendar year of 365.2425 days.
func TestAgeOrder(t *testing.T) {
	read := func(s string) Age {
		a, err := ParseAge(s)
		if err != nil {
			t.Fatal(err)
		}
		return a
	}
	rising := []string{"0 days", "6 days", "1 week", "8 days", "30 days", "1 month", "31 days", "11 months", "52 weeks", "1 year", "13 months", "17 years", "215 months", "18 years", "82 years"}
	for i, a := range rising {
		for j, b := range rising {
			if got := read(a).Less(read(b)); got != (i < j) {
				t.Errorf("%s before %s: got %v", a, b, got)
			}
		}
	}
	for _, same := range [][2]string{{"12 months", "1 year"}, {"14 days", "2 weeks"}, {"216 months", "18 years"}} {
		if read(same[0]).Cmp(read(same[1])) != 0 {
			t.Errorf("%s and %s: got unlike, want the same", same[0], same[1])
		}
	}
	if (Age{}).Less(read("1 day")) || read("1 day").Less(Age{}) {
		t.Error("an age that is not given is ordered")
	}
}

// TestAgeReadsBack holds that a printed age reads back as itself.
func TestAgeReadsBack(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		text := rapid.OneOf(rapid.StringMatching(`[0-9]{1,4} ?(years?|y|yr|months?|weeks?|days?)`), rapid.String()).Draw(t, "text")
		a, err := ParseAge(text)
		if err != nil {
			return
		}
		b, err := ParseAge(a.String())
		if err != nil || a.Cmp(b) != 0 || a.Years() != b.Years() {
			t.Fatalf("%q: printed %q, read back %v, %v", text, a, b, err)
		}
	})
}
