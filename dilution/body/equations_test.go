package body

import (
	"errors"
	"math/big"
	"testing"

	"drawup/dilution/quantity"
)

// Sources of the published values below.
const (
	clinpk = "clinPK 0.14.0, R package, 2024, its published unit tests"
	nlme   = "remifentanil data set of 65 subjects, R package nlme, as collected in Rdatasets"
	nurses = "Pharmacology for Nurses, open textbook, 2024, Dosage Calculations"
)

func kg(t *testing.T, s string) quantity.BodyWeight {
	t.Helper()
	w, err := quantity.ParseBodyWeight(s + " kg")
	if err != nil {
		t.Fatal(err)
	}
	return w
}

func cm(t *testing.T, s string) quantity.Length {
	t.Helper()
	l, err := quantity.ParseLength(s + " cm")
	if err != nil {
		t.Fatal(err)
	}
	return l
}

func sized(t *testing.T, sex Sex, height, weight string) Size {
	t.Helper()
	s := Size{Sex: sex, Height: cm(t, height)}
	if weight != "" {
		s.Weight = kg(t, weight)
	}
	return s
}

// places counts the decimals of a published figure.
func places(s string) int {
	for i := range s {
		if s[i] == '.' {
			return len(s) - i - 1
		}
	}
	return 0
}

// printed compares got, rounded half up to the published decimals.
func printed(t *testing.T, got *big.Rat, want, source string) {
	t.Helper()
	if text := got.FloatString(places(want)); text != want {
		t.Errorf("got %s, want %s (%s)", text, want, source)
	}
}

// TestPublishedWeights holds published weights to their last printed digit.
func TestPublishedWeights(t *testing.T) {
	ideal, adj, lean, jam, bo := Size.Ideal, Size.Adjusted, Size.Lean, Size.James, Size.Boer
	for _, c := range []struct {
		id, source     string
		equation       func(Size) (quantity.BodyWeight, error)
		sex            Sex
		height, weight string
		want           string
	}{
		{"A144", clinpk, ideal, Male, "180", "", "75.0"},
		{"A145", clinpk, ideal, Female, "160", "", "52.381890"},
		{"man 160 cm", clinpk, ideal, Male, "160", "", "56.881890"},
		{"A147", clinpk, adj, Male, "180", "80", "77.0"},
		{"A149", clinpk, lean, Male, "150", "80", "51.643454"},
		{"A150, BMI 20", clinpk, lean, Male, "200", "80", "67"},
		{"A151", clinpk, jam, Female, "150", "80", "43.502222"},
		{"A152", clinpk, jam, Male, "150", "50", "40.8"},
		{"A153", clinpk, bo, Male, "155", "65", "48.6"},
		{"woman by Boer", "by hand: 16.38 + 73.315 - 48.3", bo, Female, "155", "65", "41.395"},
		{"A158", nlme, jam, Male, "171", "72", "56.5075"},
		{"A160", nlme, jam, Male, "170", "90", "63.1246"},
		{"A162", nlme, jam, Male, "188", "100", "73.7845"},
		{"A164", nlme, jam, Female, "161", "58.6", "43.0953"},
		{"A166", nlme, jam, Female, "163", "50", "39.574"},
		{"A168", nlme, jam, Male, "184", "106", "74.1198"},
		{"A170", nlme, jam, Female, "177", "90", "58.0351"},
		{"A172", nlme, jam, Female, "165", "54.4", "42.1204"},
	} {
		t.Run(c.id, func(t *testing.T) {
			w, err := c.equation(sized(t, c.sex, c.height, c.weight))
			if err != nil {
				t.Fatal(err)
			}
			printed(t, w.Rat(), c.want, c.source)
		})
	}
}

// TestAdjustedFromIdeal is row A148 (clinPK 0.14.0): ideal 40 kg and actual
// 50 kg give 44.0 kg. The height is the one at which the Devine rule gives
// exactly 40 kg for a woman.
func TestAdjustedFromIdeal(t *testing.T) {
	height := quo(mul(sub(rat(60, 1), rat(55, 23)), rat(254, 100)), rat(1, 1))
	s := Size{Sex: Female, Height: quantity.Centimetres(height), Weight: kg(t, "50")}
	w, err := s.Adjusted()
	if err != nil {
		t.Fatal(err)
	}
	if w.Exact() != "44" {
		t.Errorf("got %s kg, want 44 (%s)", w.Exact(), clinpk)
	}
}

// TestAdjustedBelowIdeal uses the actual weight where it is below the ideal
// one (common practice, no source seen).
func TestAdjustedBelowIdeal(t *testing.T) {
	w, err := sized(t, Male, "180", "60").Adjusted()
	if err != nil || w.Exact() != "60" {
		t.Errorf("got %s, %v, want 60", w.Exact(), err)
	}
}

// TestPublishedSurfaces holds surface areas to their last printed digit.
func TestPublishedSurfaces(t *testing.T) {
	for _, c := range []struct {
		id, source     string
		equation       func(Size) (quantity.BodySurfaceArea, error)
		height, weight string
		want           string
	}{
		{"A105", nurses, Size.Mosteller, "97", "16.8", "0.67"},
		{"A141", clinpk, Size.DuBois, "180", "80", "1.996"},
		{"Mosteller 180 cm 80 kg", clinpk, Size.Mosteller, "180", "80", "2.000"},
		{"A157", nlme, Size.DuBois, "171", "72", "1.8393"},
		{"A159", nlme, Size.DuBois, "170", "90", "2.0137"},
		{"A161", nlme, Size.DuBois, "188", "100", "2.2653"},
		{"A163", nlme, Size.DuBois, "161", "58.6", "1.6131"},
		{"A165", nlme, Size.DuBois, "163", "50", "1.5215"},
		{"A167", nlme, Size.DuBois, "184", "106", "2.2862"},
		{"A169", nlme, Size.DuBois, "177", "90", "2.0735"},
		{"A171", nlme, Size.DuBois, "165", "54.4", "1.591"},
	} {
		t.Run(c.id, func(t *testing.T) {
			a, err := c.equation(sized(t, 0, c.height, c.weight))
			if err != nil {
				t.Fatal(err)
			}
			printed(t, a.Rat(), c.want, c.source)
		})
	}
}

// TestFortyDigits compares roots and powers with the decimal module of the
// Python standard library, worked there to 80 digits by logarithms and
// rounded once to 40, half up.
func TestFortyDigits(t *testing.T) {
	for _, c := range []struct{ height, weight, mosteller, duBois string }{
		{"180", "80", "2", "1.99642102227504499779653742767318228818"},
		{"171", "72", "1.849324200890692935075057714436273267571", "1.839309502969215582441967905568442814135"},
		{"161", "58.6", "1.618864485441021163370485132262805211048", "1.61313818120232910981336241325311518061"},
		{"97", "16.8", "0.6728050733062784111712993887585112905717", "0.6569499376232150523141462384110842304623"},
		{"49", "3.2", "0.2086996778999803716648562090815857819745", "0.1979006508326227175429168450964848734661"},
		{"250", "400", "5.270462766947298886664822574054530889533", "5.020515662234427105263317087352662534171"},
	} {
		s := sized(t, 0, c.height, c.weight)
		m, err := s.Mosteller()
		if err != nil || m.Exact() != c.mosteller {
			t.Errorf("Mosteller %s cm %s kg: got %s, %v, want %s", c.height, c.weight, m.Exact(), err, c.mosteller)
		}
		d, err := s.DuBois()
		if err != nil || d.Exact() != c.duBois {
			t.Errorf("Du Bois %s cm %s kg: got %s, %v, want %s", c.height, c.weight, d.Exact(), err, c.duBois)
		}
	}
}

// TestBMI is row A154 (clinPK 0.14.0): 80 kg, 180 cm, 24.7 kg/m².
func TestBMI(t *testing.T) {
	bmi, err := sized(t, 0, "180", "80").BMI()
	if err != nil {
		t.Fatal(err)
	}
	printed(t, bmi, "24.7", clinpk)
}

// TestObesity follows the equations into obesity. The figures were worked from
// the published equations beforehand and apart from this package, for a man of
// 178 cm and a woman of 165 cm, to 0.1 kg; BMI fixes the weight. At BMI 22 the
// adjusted weight falls back on the actual one.
func TestObesity(t *testing.T) {
	for _, c := range []struct {
		sex             Sex
		height          string
		bmi             int64
		james, lean, ab string
	}{
		{Male, "178", 22, "57.0", "56.5", "69.7"},
		{Male, "178", 30, "68.1", "67.0", "81.9"},
		{Male, "178", 37, "73.4", "74.1", "90.8"},
		{Male, "178", 43, "74.9", "79.1", "98.4"},
		{Male, "178", 50, "72.9", "84.0", "107.3"},
		{Male, "178", 60, "63.1", "89.7", "120.0"},
		{Male, "178", 70, "45.2", "94.3", "132.6"},
		{Female, "165", 22, "44.6", "39.2", "58.1"},
		{Female, "165", 30, "51.1", "47.0", "66.8"},
		{Female, "165", 37, "52.6", "52.4", "74.4"},
		{Female, "165", 43, "50.8", "56.3", "81.0"},
		{Female, "165", 50, "44.9", "60.1", "88.6"},
		{Female, "165", 60, "29.7", "64.7", "99.5"},
		{Female, "165", 70, "6.5", "68.3", "110.4"},
	} {
		s := Size{Sex: c.sex, Height: cm(t, c.height)}
		m := quo(s.Height.Rat(), rat(100, 1))
		s.Weight = quantity.Kilograms(mul(rat(c.bmi, 1), mul(m, m)))
		const source = "worked from the published equations"
		j, err1 := s.James()
		l, err2 := s.Lean()
		a, err3 := s.Adjusted()
		if err := errors.Join(err1, err2, err3); err != nil {
			t.Fatal(err)
		}
		printed(t, j.Rat(), c.james, source)
		printed(t, l.Rat(), c.lean, source)
		printed(t, a.Rat(), c.ab, source)
	}
}
