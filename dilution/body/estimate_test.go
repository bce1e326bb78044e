package body

import (
	"errors"
	"strings"
	"testing"

	"drawup/dilution/quantity"
)

func ageOf(t *testing.T, s string) Age {
	t.Helper()
	a, err := ParseAge(s)
	if err != nil {
		t.Fatal(err)
	}
	return a
}

// TestAgeRules holds each rule at and beyond the ends of its ages. A140 is
// Marikar, BMJ Innov 2015: 10 kg at 1 year, 25 kg at 6 years. The rest is worked
// by hand from the equations: APLS 2011 as Marikar prints them, the older rule
// and Luscombe-Owens as Arch Dis Child 2007;92:412 does, for 1 to 10 years.
func TestAgeRules(t *testing.T) {
	for _, c := range []struct {
		rule     AgeRule
		age, kg  string // "" for refused
		equation string
	}{
		{APLS2011, "1 year", "10", "2 x completed years + 8"}, // A140
		{APLS2011, "6 years", "25", "3 x completed years + 7"},
		{APLS2011, "1 month", "4.5", "0.5 x completed months + 4"},
		{APLS2011, "11 months", "9.5", "0.5 x completed months + 4"},
		{APLS2011, "12 months", "10", "2 x completed years + 8"},
		{APLS2011, "23 months", "10", "2 x completed years + 8"},
		{APLS2011, "5 years", "18", "2 x completed years + 8"},
		{APLS2011, "71 months", "18", "2 x completed years + 8"},
		{APLS2011, "12 years", "43", "3 x completed years + 7"},
		{APLS2011, "13 years", "", ""}, {APLS2011, "0 days", "", ""}, {APLS2011, "30 days", "", ""},
		{APLS2011, "31 days", "4.5", "0.5 x completed months + 4"},
		{APLS2011, "8 weeks", "4.5", "0.5 x completed months + 4"}, // 56 days: one completed month
		{APLSOld, "1 year", "10", "2 x (completed years + 4)"}, {APLSOld, "10 years", "28", "2 x (completed years + 4)"},
		{APLSOld, "11 years", "", ""}, {APLSOld, "11 months", "", ""},
		{LuscombeOwens, "1 year", "10", "3 x completed years + 7"}, {LuscombeOwens, "10 years", "37", "3 x completed years + 7"},
		{LuscombeOwens, "11 years", "", ""}, {LuscombeOwens, "54 years", "", ""},
		{Erker, "5 years", "", ""}, {0, "5 years", "", ""},
	} {
		got, err := c.rule.Guess(ageOf(t, c.age))
		var out *OutsideEquation
		if c.kg == "" {
			if !errors.As(err, &out) || got.Weight.Given() {
				t.Errorf("%v at %s: got %s, %v, want it refused", c.rule, c.age, got.Weight.Exact(), err)
			}
			continue
		}
		if err != nil || got.Weight.Exact() != c.kg || got.Equation != c.equation || got.Source == "" || got.Known == "" {
			t.Errorf("%v at %s: got %s kg by %q, %v, want %s by %q", c.rule, c.age, got.Weight.Exact(), got.Equation, err, c.kg, c.equation)
		}
	}
	var missing *MissingError
	if _, err := APLS2011.Guess(Age{}); !errors.As(err, &missing) || missing.What != NeedAge {
		t.Errorf("no age: got %v", err)
	}
}

func TestAgeRuleNames(t *testing.T) {
	for _, r := range AgeRules() {
		if got, ok := AgeRuleNamed(strings.ToUpper(r.String())); !ok || got != r {
			t.Errorf("%v does not read back", r)
		}
	}
	for _, s := range []string{"", "APLS", "EPLS", "apls 2012"} {
		if r, ok := AgeRuleNamed(s); ok {
			t.Errorf("%q: got %v, want nothing: the name must say which rule", s, r)
		}
	}
	if got := APLS2011.Ages(); got != "1 to 12 months, 1 to 5 years, 6 to 12 years" {
		t.Errorf("got %q", got)
	}
}

// TestChildIdeal: A146 (clinPK 0.14.0) gives 37.125 kg at 150 cm. The rest is by
// hand: 60 inches are 152.4 cm; 63 inches are 160.02 cm, 39 + 3 x 2.27 = 45.81.
func TestChildIdeal(t *testing.T) {
	for _, c := range []struct {
		sex         Sex
		height, age string
		want        string
	}{
		{0, "150", "12 years", "37.125"},
		{0, "100", "4 years", "16.5"},
		{Male, "152.4", "13 years", "39"},
		{Female, "152.4", "13 years", "42.2"},
		{Male, "160.02", "17 years", "45.81"},
		{Female, "160.02", "14 years", "49.01"},
		{0, "160", "14 years", ""}, {Male, "170", "18 years", ""}, {Male, "70", "11 months", ""}, {Male, "150", "", ""},
	} {
		s := Size{Sex: c.sex, Height: cm(t, c.height)}
		if c.age != "" {
			s.Age = ageOf(t, c.age)
		}
		w, err := s.ChildIdeal()
		if w.Exact() != c.want || (err == nil) != (c.want != "") {
			t.Errorf("%v %s cm %s: got %q, %v, want %q", c.sex, c.height, c.age, w.Exact(), err, c.want)
		}
	}
}

// TestAdjustedFromGiven is row A148 (clinPK 0.14.0): ideal 40 kg and actual 50 kg
// give 44.0 kg.
func TestAdjustedFromGiven(t *testing.T) {
	for _, c := range []struct{ ideal, actual, want string }{{"40", "50", "44"}, {"60", "50", "50"}, {"50", "50", "50"}} {
		w, err := Size{Weight: kg(t, c.actual)}.AdjustedFrom(kg(t, c.ideal))
		if err != nil || w.Exact() != c.want {
			t.Errorf("ideal %s, actual %s: got %s, %v, want %s", c.ideal, c.actual, w.Exact(), err, c.want)
		}
	}
	if _, err := (Size{Weight: kg(t, "50")}).AdjustedFrom(quantity.BodyWeight{}); err == nil {
		t.Error("an adjusted weight from no ideal weight")
	}
	if _, err := (Size{}).AdjustedFrom(kg(t, "40")); err == nil {
		t.Error("an adjusted weight of nobody")
	}
}
