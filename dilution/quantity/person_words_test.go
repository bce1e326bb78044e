package quantity

import (
	"errors"
	"testing"
)

// TestWeightsInWords holds the international pound, 0.45359237 kg exactly, and
// 14 pounds in a stone; the figures are worked by hand from them.
func TestWeightsInWords(t *testing.T) {
	for text, want := range map[string]string{
		"72 kg": "72", "165 pounds": "74.84274105", "1 pound": "0.45359237", "11 stone": "69.85322498",
		"11 stone 4 pounds": "71.66759446", "11 stones 4 pounds": "71.66759446", "11 stone, 4 pounds": "71.66759446",
		"11 stone and 4 pounds": "71.66759446", " 11  stone  4.5  pounds ": "71.894390645", "11 stone 0 pounds": "69.85322498",
		"7.5 pounds": "3.401942775",
	} {
		w, err := ParseAnyBodyWeight(text)
		if err != nil || w.Exact() != want {
			t.Errorf("%q: got %q, %v, want %s kg", text, w.Exact(), err, want)
		}
	}
}

// TestHeightsInWords holds the inch, 2.54 cm exactly, and 12 inches in a foot.
func TestHeightsInWords(t *testing.T) {
	for text, want := range map[string]string{
		"178 cm": "178", "1.78 m": "178", "5 feet 7 inches": "170.18", "67 inches": "170.18", "6 feet": "182.88",
		"5 feet 7.5 inches": "171.45", "5 feet 0 inches": "152.4", "1 foot 1 inch": "33.02", "60 inches": "152.4",
	} {
		l, err := ParseAnyLength(text)
		if err != nil || l.Exact() != want {
			t.Errorf("%q: got %q, %v, want %s cm", text, l.Exact(), err, want)
		}
	}
}

// TestShortWordsRefused holds that abbreviations, slips and open texts are
// refused, and that the reading named reads.
func TestShortWordsRefused(t *testing.T) {
	for _, c := range []struct {
		text   string
		code   Fault
		likely string
	}{
		{"165 lb", WrongUnit, "165 pounds"}, {"165lbs", WrongUnit, "165 pounds"}, {"165 LB.", WrongUnit, "165 pounds"},
		{"165#", WrongUnit, "165 pounds"}, {"1 lb", WrongUnit, "1 pound"},
		{"11 st 4 lb", WrongUnit, "11 stone 4 pounds"}, {"11st 4lb", WrongUnit, "11 stone 4 pounds"},
		{"11 stone 4", UnknownUnit, "11 stone 4 pounds"}, {"11 stone 4 lb", WrongUnit, "11 stone 4 pounds"},
		{"11.4 stone", BadNumber, ""}, {"11.5 stone 4 pounds", BadNumber, ""}, {"11 stone 14 pounds", BadNumber, ""},
		{"4 pounds 11 stone", BadNumber, ""}, {"4 pounds 3 pounds", BadNumber, ""},
		{"0 pounds", ZeroOrLess, ""}, {"0 stone 9 pounds", ZeroOrLess, ""}, {"-165 pounds", BadNumber, ""},
		{"165,5 pounds", CommaNumber, "165.5 pounds"}, {"1,650 lb", WrongUnit, "1650 pounds"},
		{"165 pounds of", UnknownUnit, ""}, {"11 stone 4 ounces", UnknownUnit, ""}, {"165 pound s", UnknownUnit, ""},
		{"72 Kg", UnknownUnit, "72 kg"}, {"72000 g", WrongUnit, "72 kg"}, {"72", UnknownUnit, ""}, {"", EmptyText, ""},
		{"pounds", BadNumber, ""}, {"9999999999999999 pounds", TooManyDigit, ""},
	} {
		_, err := ParseAnyBodyWeight(c.text)
		checkRefused(t, c.text, err, c.code, c.likely)
	}
	for _, c := range []struct {
		text   string
		code   Fault
		likely string
	}{
		{"5 ft 7 in", WrongUnit, "5 feet 7 inches"}, {"5ft 7in.", WrongUnit, "5 feet 7 inches"}, {"67 in", WrongUnit, "67 inches"},
		{`5'7"`, WrongUnit, "5 feet 7 inches"}, {"5′ 7″", WrongUnit, "5 feet 7 inches"}, {"5'7", WrongUnit, "5 feet 7 inches"},
		{"5' 7''", WrongUnit, "5 feet 7 inches"}, {"6'", WrongUnit, "6 feet"}, {`67"`, WrongUnit, "67 inches"},
		{"5 feet 7", UnknownUnit, "5 feet 7 inches"}, {"5.6 feet", BadNumber, ""}, {"5 feet 12 inches", BadNumber, ""},
		{"7 inches 5 feet", BadNumber, ""}, {"5 feet 7 cm", UnknownUnit, ""}, {"0 inches", ZeroOrLess, ""},
		{"178", UnknownUnit, ""}, {"5 yards", UnknownUnit, ""}, {`7"5'`, WrongUnit, ""},
	} {
		_, err := ParseAnyLength(c.text)
		checkRefused(t, c.text, err, c.code, c.likely)
	}
}

func checkRefused(t *testing.T, text string, err error, code Fault, likely string) {
	t.Helper()
	var e *SyntaxError
	if !errors.As(err, &e) {
		t.Errorf("%q: got %v, want it refused", text, err)
		return
	}
	if e.Code != code || e.Likely != likely {
		t.Errorf("%q: got %s, %q (%s), want %s, %q", text, e.Code, e.Likely, e.Why, code, likely)
	}
}

// An abbreviated weight is told in kg as well, for the one who has no tables.
func TestShortWeightNamesKilograms(t *testing.T) {
	_, err := ParseAnyBodyWeight("165 lb")
	if want := `"lb" can be misread and must be written out; 165 pounds is about 74.8 kg`; err == nil || err.(*SyntaxError).Why != want {
		t.Errorf("got %v, want %s", err, want)
	}
}

// Order files know kg and cm alone.
func TestOrdersStayMetric(t *testing.T) {
	if _, err := ParseBodyWeight("165 pounds"); err == nil {
		t.Error("pounds pass as a body weight of an order")
	}
	if _, err := ParseLength("67 inches"); err == nil {
		t.Error("inches pass as a height of an order")
	}
}
