package body

import (
	"errors"
	"math/big"
	"strings"
	"testing"

	"drawup/dilution/quantity"

	"pgregory.net/rapid"
)

func aged(t *testing.T, s Size, age string) Size {
	t.Helper()
	a, err := ParseAge(age)
	if err != nil {
		t.Fatal(err)
	}
	s.Age = a
	return s
}

// TestMissing holds that each equation names the first value it lacks.
func TestMissing(t *testing.T) {
	weight := func(f func(Size) (quantity.BodyWeight, error)) func(Size) error {
		return func(s Size) error { _, err := f(s); return err }
	}
	surface := func(f func(Size) (quantity.BodySurfaceArea, error)) func(Size) error {
		return func(s Size) error { _, err := f(s); return err }
	}
	bmi := func(s Size) error { _, err := s.BMI(); return err }
	used := func(s Size) error { _, err := s.Used(Actual); return err }
	full := sized(t, Male, "180", "80")
	noSex, noHeight, noWeight := full, full, full
	noSex.Sex, noHeight.Height, noWeight.Weight = 0, quantity.Length{}, quantity.BodyWeight{}
	for name, c := range map[string]struct {
		equation func(Size) error
		size     Size
		want     Value
	}{
		"ideal sex":       {weight(Size.Ideal), noSex, NeedSex},
		"ideal height":    {weight(Size.Ideal), noHeight, NeedHeight},
		"adjusted weight": {weight(Size.Adjusted), noWeight, NeedWeight},
		"lean sex":        {weight(Size.Lean), noSex, NeedSex},
		"lean height":     {weight(Size.Lean), noHeight, NeedHeight},
		"lean weight":     {weight(Size.Lean), noWeight, NeedWeight},
		"james sex":       {weight(Size.James), noSex, NeedSex},
		"boer weight":     {weight(Size.Boer), noWeight, NeedWeight},
		"bmi height":      {bmi, noHeight, NeedHeight},
		"mosteller":       {surface(Size.Mosteller), noWeight, NeedWeight},
		"du bois":         {surface(Size.DuBois), noHeight, NeedHeight},
		"used surface":    {surface(Size.UsedSurface), noHeight, NeedHeight},
		"used actual":     {used, noWeight, NeedWeight},
		"nothing known":   {weight(Size.Ideal), Size{}, NeedSex},
	} {
		var missing *MissingError
		if err := c.equation(c.size); !errors.As(err, &missing) || missing.What != c.want {
			t.Errorf("%s: got %v, want that %s is missing", name, err, c.want)
		}
	}
}

// TestChildren refuses the adult equations under 18 years: lean weight is not
// validated in children (size descriptors in obesity, table 2, Arch Dis Child
// Educ Pract). Actual weight and surface area stay.
func TestChildren(t *testing.T) {
	for _, age := range []string{"17 years", "3 years", "215 months", "0 days"} {
		child := aged(t, sized(t, Female, "160", "50"), age)
		for _, kind := range []Kind{Ideal, Adjusted, Lean} {
			var out *OutsideEquation
			if _, err := child.Used(kind); !errors.As(err, &out) || out.Source == "" || !strings.Contains(err.Error(), "18 years") {
				t.Errorf("age %s, %v: got %v, want it refused as outside the equation", age, kind, err)
			}
		}
		for _, f := range []func(Size) (quantity.BodyWeight, error){Size.James, Size.Boer} {
			var out *OutsideEquation
			if _, err := f(child); !errors.As(err, &out) {
				t.Errorf("age %s: got %v, want a lean weight refused", age, err)
			}
		}
		if w, err := child.Used(Actual); err != nil || w.Exact() != "50" {
			t.Errorf("age %s: got %s, %v, want 50 kg", age, w.Exact(), err)
		}
		if a, err := child.UsedSurface(); err != nil || a.Exact() != "1.49" {
			t.Errorf("age %s: got %s, %v, want 1.49 m²", age, a.Exact(), err)
		}
		if notes := child.Notes(); len(notes) != 0 {
			t.Errorf("age %s: got notes %v, want none beside the refusals", age, notes)
		}
	}
	for _, age := range []string{"18 years", "216 months"} {
		if _, err := aged(t, sized(t, Female, "160", "50"), age).Used(Lean); err != nil {
			t.Errorf("age %s: got %v, want a lean weight", age, err)
		}
	}
}

// TestNotes puts each caution just inside and just outside its range. The
// ranges of the lean weight are those of its index set: 18 to 82 years, 40.7
// to 216.5 kg, BMI 17.1 to 69.9 (Janmahasatian et al., Clin Pharmacokinet
// 2005;44:1051-1065). The rest: 60 inches are 152.4 cm; 100 kg for men and
// 70 kg for women as quoted from the Association of Anaesthetists of Great
// Britain and Ireland, 2015, which a man of 178 cm reaches at 272 kg and a
// woman of 165 cm at 205 kg (worked from the equation).
func TestNotes(t *testing.T) {
	for _, c := range []struct {
		name           string
		sex            Sex
		height, weight string
		age            string
		kind           Kind
		want           string // codes, blank for none
	}{
		{"60 inches", Male, "152.4", "60", "40 years", Ideal, ""},
		{"under 60 inches", Male, "152.3", "60", "40 years", Ideal, outside},
		{"under 60 inches, adjusted", Female, "150", "60", "40 years", Adjusted, outside},
		{"under 60 inches, lean", Female, "150", "60", "40 years", Lean, ""},
		{"under 60 inches, actual", Female, "150", "60", "40 years", Actual, ""},
		{"82 years", Female, "158", "54", "82 years", Lean, ""},
		{"83 years", Female, "158", "54", "83 years", Lean, outside},
		{"40.7 kg", Female, "150", "40.7", "40 years", Lean, ""},
		{"40.6 kg", Female, "150", "40.6", "40 years", Lean, outside},
		{"216.5 kg", Male, "180", "216.5", "40 years", Lean, ""},
		{"216.6 kg", Male, "180", "216.6", "40 years", Lean, outside},
		{"BMI 17.1", Male, "200", "68.4", "40 years", Lean, ""},
		{"BMI below 17.1", Male, "200", "68.3", "40 years", Lean, outside},
		{"BMI 69.9", Male, "150", "157.275", "40 years", Lean, ""},
		{"BMI above 69.9", Male, "150", "157.3", "40 years", Lean, outside},
		{"man below 100 kg lean", Male, "178", "271", "40 years", Lean, outside + " " + outside},
		{"man above 100 kg lean", Male, "178", "273", "40 years", Lean, outside + " " + outside + " " + plateau},
		{"woman below 70 kg lean", Female, "165", "204", "40 years", Lean, outside},
		{"woman above 70 kg lean", Female, "165", "206", "40 years", Lean, outside + " " + plateau},
		{"no age", Male, "180", "80", "", Lean, noAge},
		{"no age, ideal", Male, "150", "80", "", Ideal, noAge + " " + outside},
		{"no age, surface", Male, "150", "80", "", Surface, ""},
		{"no age, absolute", Male, "150", "80", "", None, ""},
	} {
		s := sized(t, c.sex, c.height, c.weight)
		if c.age != "" {
			s = aged(t, s, c.age)
		}
		if got := codes(s.NotesFor(c.kind)); got != c.want {
			t.Errorf("%s: got %q, want %q", c.name, got, c.want)
		}
	}
}

func codes(list []Note) string {
	var words []string
	for _, n := range list {
		if n.Text == "" || n.Source == "" {
			return "a note without text or source"
		}
		words = append(words, n.Code)
	}
	return strings.Join(words, " ")
}

// TestJamesMaximum puts the caution at BMI 42.97 (men) and 36.15 (women), where
// the James equation has its maximum, and refuses it past BMI 85.9 (men) and
// 72.3 (women), where it reaches zero. Nyman, Radiology 2016;278:956-957,
// prints about 43 and 37 for the turn.
func TestJamesMaximum(t *testing.T) {
	for _, c := range []struct {
		sex         Sex
		bmi         *big.Rat
		noted, gone bool
	}{
		{Male, rat(4296, 100), false, false},
		{Male, rat(4298, 100), true, false},
		{Male, rat(858, 10), true, false},
		{Male, rat(860, 10), true, true},
		{Female, rat(3614, 100), false, false},
		{Female, rat(3616, 100), true, false},
		{Female, rat(722, 10), true, false},
		{Female, rat(724, 10), true, true},
	} {
		s := aged(t, Size{Sex: c.sex, Height: cm(t, "200"), Weight: quantity.Kilograms(mul(c.bmi, rat(4, 1)))}, "40 years")
		noted := false
		for _, n := range s.Notes() {
			noted = noted || strings.Contains(n.Text, "James")
		}
		if noted != c.noted {
			t.Errorf("%v BMI %s: got noted %v, want %v", c.sex, c.bmi.FloatString(2), noted, c.noted)
		}
		_, err := s.James()
		var out *OutsideEquation
		if errors.As(err, &out) != c.gone {
			t.Errorf("%v BMI %s: got %v, want refused %v", c.sex, c.bmi.FloatString(2), err, c.gone)
		}
	}
}

// TestDevineFallsToNothing refuses an ideal weight of zero or less; the rule
// turns negative near 97 cm in men.
func TestDevineFallsToNothing(t *testing.T) {
	var out *OutsideEquation
	if _, err := sized(t, Male, "97", "").Ideal(); !errors.As(err, &out) {
		t.Errorf("97 cm: got %v, want it refused", err)
	}
	if _, err := sized(t, Male, "98", "").Ideal(); err != nil {
		t.Errorf("98 cm: got %v, want a weight", err)
	}
}

// TestUsed holds the rounding of what is dosed by: 0.1 kg half up, 0.01 m²
// half up, actual as typed. Expected weights are the published ones above,
// rounded by hand; a man of 150 cm has 47.83 kg by the Devine rule.
func TestUsed(t *testing.T) {
	for _, c := range []struct {
		sex            Sex
		height, weight string
		kind           Kind
		want           string
	}{
		{Male, "180", "80.123", Actual, "80.123"},
		{Male, "180", "80", Ideal, "75"},
		{Female, "160", "80", Ideal, "52.4"},
		{Male, "150", "80", Ideal, "47.8"},
		{Male, "180", "80", Adjusted, "77"},
		{Male, "150", "80", Lean, "51.6"},
	} {
		w, err := sized(t, c.sex, c.height, c.weight).Used(c.kind)
		if err != nil || w.Exact() != c.want {
			t.Errorf("%v %s cm %s kg %v: got %s, %v, want %s", c.sex, c.height, c.weight, c.kind, w.Exact(), err, c.want)
		}
	}
	for _, kind := range []Kind{Surface, None, 0, 99} {
		var not *NotAWeightError
		if _, err := sized(t, Male, "180", "80").Used(kind); !errors.As(err, &not) {
			t.Errorf("%v: got %v, want it refused as no weight", kind, err)
		}
	}
}

// TestUsedSurfaceTie rounds an exact tie up: 100 cm and 87.6096 kg have the
// square 2.4336 and the root 1.56; the square 2.449225 has the root 1.565.
func TestUsedSurfaceTie(t *testing.T) {
	for weight, want := range map[string]string{"87.6096": "1.56", "88.1721": "1.57", "88.172": "1.56"} {
		a, err := sized(t, 0, "100", weight).UsedSurface()
		if err != nil || a.Exact() != want {
			t.Errorf("%s kg: got %s, %v, want %s", weight, a.Exact(), err, want)
		}
	}
}

// TestUsedSurfaceEncloses holds the printed area to the second route's rule:
// its square, half a step either way, encloses height x weight / 3600.
func TestUsedSurfaceEncloses(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		h := rat(rapid.Int64Range(250, 2500).Draw(t, "mm"), 10)
		w := rat(rapid.Int64Range(3, 4000).Draw(t, "hg"), 10)
		a, err := Size{Height: quantity.Centimetres(h), Weight: quantity.Kilograms(w)}.UsedSurface()
		if err != nil {
			t.Fatal(err)
		}
		square := quo(mul(h, w), rat(3600, 1))
		low, high := sub(a.Rat(), rat(5, 1000)), add(a.Rat(), rat(5, 1000))
		if mul(low, low).Cmp(square) > 0 || square.Cmp(mul(high, high)) >= 0 {
			t.Fatalf("%s cm %s kg: got %s", h, w, a.Exact())
		}
	})
}
