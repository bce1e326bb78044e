package quantity

import (
	"errors"
	"math/big"
	"strings"
	"testing"
)

// faultIn is the fault of an error; the test ends if it is of another type.
func faultIn(t testing.TB, text string, err error) *SyntaxError {
	t.Helper()
	var fault *SyntaxError
	if !errors.As(err, &fault) {
		t.Fatalf("%q: got error %v, want a *SyntaxError", text, err)
	}
	return fault
}

func rat(t testing.TB, s string) *big.Rat {
	t.Helper()
	r, ok := new(big.Rat).SetString(s)
	if !ok {
		t.Fatalf("%q is no fraction", s)
	}
	return r
}

// TestNumbersRefused: which numbers are refused follows from the accepted
// pattern (digits, at most one point with digits on both sides, at most 15
// characters). Naked points: ISMP list of error-prone dose designations, "lack
// of leading zero" and "trailing zero". Comma: the SI Brochure 5.3.3 forbids it
// as a group sign, ISMP asks for it; so it is open. Likely readings are common
// practice, without a source; an open reading has none.
func TestNumbersRefused(t *testing.T) {
	for _, c := range []struct {
		number string
		code   Fault
		likely string
	}{
		{"1,5", CommaNumber, "1.5 mg"}, {"0,5", CommaNumber, "0.5 mg"}, {"0,500", CommaNumber, "0.5 mg"},
		{"5,0", CommaNumber, "5 mg"}, {"1,000", CommaNumber, "1000 mg"}, {"12,500", CommaNumber, "12500 mg"},
		{"1,000,000", CommaNumber, "1000000 mg"}, {"1,000.5", CommaNumber, "1000.5 mg"}, {"1.000,5", CommaNumber, "1000.5 mg"},
		{"1,5,2", CommaNumber, ""}, {",5", CommaNumber, ""}, {"5,", CommaNumber, ""}, {"-1,5", CommaNumber, ""}, {"1,0000", CommaNumber, ""},
		{"007,5", CommaNumber, ""}, {"0,005", CommaNumber, "0.005 mg"}, {"1234,567", CommaNumber, "1234.567 mg"}, {"1234,567,890", CommaNumber, ""}, {"1,00,000", CommaNumber, ""},
		{"1.2.3", BadNumber, ""}, {"1..5", BadNumber, "1.5 mg"}, {"1.000.000", BadNumber, "1000000 mg"},
		{".5", BadNumber, "0.5 mg"}, {".50", BadNumber, "0.5 mg"}, {"5.", BadNumber, "5 mg"}, {"50.0.", BadNumber, "50 mg"}, {".", BadNumber, ""},
		{"5-", BadNumber, ""}, {"-5", BadNumber, ""}, {"\u22125", BadNumber, ""}, {"\u20135", BadNumber, ""}, {"-.5", BadNumber, ""},
		{"5-10", BadNumber, ""}, {"5 - 10", BadNumber, ""}, {"5\u201310", BadNumber, ""}, {"+5", BadNumber, "5 mg"}, {"+5.0", BadNumber, "5 mg"},
		{"1e3", BadNumber, "1000 mg"}, {"1E3", BadNumber, "1000 mg"}, {"5e-1", BadNumber, "0.5 mg"}, {"1.50e+1", BadNumber, "15 mg"}, {"1e99", BadNumber, ""}, {"-1e3", BadNumber, ""},
		{"½", BadNumber, "0.5 mg"}, {"1½", BadNumber, "1.5 mg"}, {"1 ¼", BadNumber, "1.25 mg"}, {"⅓", BadNumber, ""},
		{"1/2", BadNumber, "0.5 mg"}, {"3/4", BadNumber, "0.75 mg"}, {"1/3", BadNumber, ""}, {"1 1/2", BadNumber, ""}, {"1/0", BadNumber, ""},
		{"0x10", BadNumber, ""}, {"0b11", UnknownUnit, ""}, {"1_000", BadNumber, "1000 mg"}, {"1'000", BadNumber, "1000 mg"},
		{"1 000", BadNumber, "1000 mg"}, {"10\u202f000", BadNumber, "10000 mg"}, {"10\u00a0000", BadNumber, "10000 mg"}, {"1 00", BadNumber, ""},
		{"00.5", BadNumber, ""}, {"007", BadNumber, ""}, {"05", BadNumber, ""}, {"00", BadNumber, ""},
		{"1234567890123456", TooManyDigit, ""}, {"0.00000000000001", TooManyDigit, ""},
		{"٥", BadNumber, ""}, {"５", BadNumber, ""}, {"٣٤٥٦٧٨٩٠", BadNumber, ""}, {"Ⅴ", BadNumber, ""}, {"²", BadNumber, ""},
		{"", BadNumber, ""}, {"five", BadNumber, ""}, {"0", ZeroOrLess, ""}, {"0.0", ZeroOrLess, ""}, {"0,0", CommaNumber, ""}, {"+0", BadNumber, ""},
	} {
		text := c.number + " mg"
		a, err := ParseAmount(text)
		fault := faultIn(t, text, err)
		if fault.Code != c.code || fault.Likely != c.likely || fault.Got != text || a.Given() {
			t.Errorf("%q: got %s, likely %q, %v; want %s, likely %q", text, fault.Code, fault.Likely, err, c.code, c.likely)
		}
	}
	for _, empty := range []string{"", " ", "\t", "\u00a0", "\u202f\u2009", "\n"} {
		_, err := ParseAmount(empty)
		if fault := faultIn(t, empty, err); fault.Code != EmptyText || fault.Likely != "" {
			t.Errorf("%q: got %s, want %s", empty, fault.Code, EmptyText)
		}
		if _, _, err := ParseMix(empty); faultIn(t, empty, err).Code != EmptyText {
			t.Errorf("mix %q: got %v, want %s", empty, err, EmptyText)
		}
		if _, err := ParseConcentration(empty); faultIn(t, empty, err).Code != EmptyText {
			t.Errorf("concentration %q: got %v, want %s", empty, err, EmptyText)
		}
	}
}

// TestNumbersAccepted: the values stand in the texts; blanks of every sort may
// stand around the number (SI Brochure 5.3.3: a space, also a fixed one).
func TestNumbersAccepted(t *testing.T) {
	for text, want := range map[string]string{
		"5 mg": "5", "0.5 mg": "1/2", "12.25 mg": "49/4", "5.0 mg": "5", "0.50 mg": "1/2", "10 mg": "10",
		"123456789012345 mg": "123456789012345", "0.0000000000001 mg": "1/10000000000000",
		"5mg": "5", " 5 mg ": "5", "5\u00a0mg": "5", "\u00a05\u202fmg\u00a0": "5", "5   mg": "5", "5\tmg": "5",
	} {
		a, err := ParseAmount(text)
		if err != nil || a.Rat().Cmp(rat(t, want)) != 0 {
			t.Errorf("%q: got %v, %v, want %s mg", text, a.Rat(), err, want)
		}
	}
}

// TestErrorWords: an error names what came, what is wanted and what was
// probably meant, in lower case.
func TestErrorWords(t *testing.T) {
	_, err := ParseVolume("0,5 cc")
	for _, want := range []string{`got "0,5 cc"`, `want a volume`, `was "0.5 mL" meant?`} {
		if !strings.Contains(err.Error(), want) {
			t.Errorf("got %q, want %q in it", err, want)
		}
	}
	for text, want := range map[string]string{
		"-5 mg": "a sign or a range", "5-10 mg": "a sign or a range", "05 mg": "may have lost its point", "1,5 mg": "a decimal or a thousand",
		"5 mL": `the unit "mL" does not fit here`, "5 IU": `the unit "IU" is not known`, "5": "the unit is missing", "1 1/2 mg": "in two parts", "five mg": "no number",
	} {
		if _, err := ParseAmount(text); !strings.Contains(err.Error(), want) {
			t.Errorf("%s: got %q, want %q in it", text, err, want)
		}
	}
	for err, want := range map[error]string{
		&KindError{ByActivity, ByMass}:     "got a quantity counted by units, want one counted by mass (rule R4)",
		&BasisError{Absolute, PerKilogram}: "got a dose that is absolute, want one that is per kg (rule R3)",
		&NotGivenError{"body weight"}:      "body weight not given",
	} {
		if err.Error() != want {
			t.Errorf("got %q, want %q", err, want)
		}
	}
}
