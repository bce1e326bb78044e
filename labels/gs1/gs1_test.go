package gs1_test

import (
	"strings"
	"testing"

	"drawup/labels/gs1"
)

// Two of the check digit tests of the GS1 syntax dictionary; all of them stand
// in TestCheckDigits.
func TestCheckDigit(t *testing.T) {
	good := []gs1.Element{{AI: "01", Value: "12345678901231"}}
	bad := []gs1.Element{{AI: "01", Value: "12345678901232"}}
	if err := gs1.Check(good); err != nil {
		t.Errorf("got %v, want no error", err)
	}
	if err := gs1.Check(bad); err == nil || !strings.Contains(err.Error(), "want 1") {
		t.Errorf("got %v, want the digit 1", err)
	}
	if d, err := gs1.CheckDigit("1234567890123"); err != nil || d != '1' {
		t.Errorf("got %c, %v, want 1", d, err)
	}
	if _, err := gs1.CheckDigit("12x"); err == nil {
		t.Error("got no error for a letter, want one")
	}
}

// Separators after GS1 syntax dictionary: 01 and 17 are among the identifiers
// of predefined length, 10, 21, 7003 and 91 to 99 are not; none at the end.
func TestEncode(t *testing.T) {
	for _, c := range []struct {
		elements []gs1.Element
		symbol   string
		hri      string
	}{
		{[]gs1.Element{{"91", "N01AX07"}, {"92", "261202073000001003"}, {"93", "2mg/mL"}},
			"\xe891N01AX07\xe892261202073000001003\xe8932mg/mL", "(91)N01AX07(92)261202073000001003(93)2mg/mL"},
		{[]gs1.Element{{"01", "12345678901231"}, {"17", "261200"}, {"10", "A-1"}, {"21", "7"}},
			"\xe801123456789012311726120010A-1\xe8217", "(01)12345678901231(17)261200(10)A-1(21)7"},
		{[]gs1.Element{{"01", "12345678901231"}, {"7003", "2612022359"}, {"21", "7"}},
			"\xe801123456789012317003" + "2612022359\xe8217", "(01)12345678901231(7003)2612022359(21)7"},
		{[]gs1.Element{{"99", "a(b)c"}}, "\xe899a(b)c", "(99)a(b)c"},
	} {
		symbol, hri, err := gs1.Encode(c.elements)
		if err != nil || string(symbol) != c.symbol || hri != c.hri {
			t.Errorf("got %q, %q, %v, want %q, %q", symbol, hri, err, c.symbol, c.hri)
		}
		back, err := gs1.Parse(hri)
		if err != nil || len(back) != len(c.elements) {
			t.Errorf("%q: got %v, %v, want %v", hri, back, err, c.elements)
			continue
		}
		for i := range back {
			if back[i] != c.elements[i] {
				t.Errorf("%q: got %v, want %v", hri, back[i], c.elements[i])
			}
		}
	}
}

// Each line breaks one rule of the dictionary: formats N14, X..20, N6 and
// X..90, "req" of 10, 17, 21 and 7003, checkers csum, yymmd0, yymmdd, hhmi and
// CSET 82, which has neither blank, # and @ nor anything above ASCII.
func TestRefused(t *testing.T) {
	gtin := gs1.Element{AI: "01", Value: "12345678901231"}
	for _, c := range []struct {
		why      string
		elements []gs1.Element
	}{
		{"nothing", nil},
		{"unknown identifier", []gs1.Element{{"04", "1"}}},
		{"identifier twice", []gs1.Element{{"91", "1"}, {"91", "2"}}},
		{"too short", []gs1.Element{{"01", "1234567890123"}}},
		{"too long", []gs1.Element{{"91", strings.Repeat("A", 91)}}},
		{"empty", []gs1.Element{{"91", ""}}},
		{"letters in 01", []gs1.Element{{"01", "1234567890123A"}}},
		{"10 alone", []gs1.Element{{"10", "A"}}},
		{"21 beside 91 only", []gs1.Element{{"21", "A"}, {"91", "B"}}},
		{"17 alone", []gs1.Element{{"17", "261231"}}},
		{"7003 alone", []gs1.Element{{"7003", "2612311200"}}},
		{"month 13", []gs1.Element{gtin, {"17", "261301"}}},
		{"month 00 with day 00", []gs1.Element{gtin, {"17", "260000"}}},
		{"30 February", []gs1.Element{gtin, {"17", "280230"}}},
		{"29 February 2026", []gs1.Element{gtin, {"17", "260229"}}},
		{"day 00 in 7003", []gs1.Element{gtin, {"7003", "2612001200"}}},
		{"hour 24", []gs1.Element{gtin, {"7003", "2612012400"}}},
		{"minute 60", []gs1.Element{gtin, {"7003", "2612011260"}}},
		{"blank", []gs1.Element{{"93", "2 mg/mL"}}},
		{"hash", []gs1.Element{{"91", "#1"}}},
		{"at", []gs1.Element{{"91", "a@b"}}},
		{"micro sign", []gs1.Element{{"93", "2\u00b5g/mL"}}},
		{"NUL", []gs1.Element{{"91", "\x00"}}},
		{"separator byte", []gs1.Element{{"91", "\xe8"}}},
		{"value that reads like an identifier", []gs1.Element{{"91", "a(92)b"}}},
	} {
		if _, hri, err := gs1.Encode(c.elements); err == nil {
			t.Errorf("%s: got %q, want an error", c.why, hri)
		}
	}
	for _, text := range []string{"", "91ABC", "x(91)A", "(91)", " (91)A", "(04)A", "(91)A(21)B", "(91)A(04)B"} {
		if got, err := gs1.Parse(text); err == nil {
			t.Errorf("%q: got %v, want an error", text, got)
		}
	}
	leap := []gs1.Element{gtin, {"17", "280229"}}
	if err := gs1.Check(leap); err != nil {
		t.Errorf("29 February 2028: got %v, want no error", err)
	}
}

// 82 signs are allowed in all, hence the name of the set.
func TestEightyTwoSigns(t *testing.T) {
	count := 0
	for c := range rune(0x250) {
		if gs1.Check([]gs1.Element{{AI: "91", Value: string(c)}}) == nil {
			count++
		}
	}
	if count != 82 {
		t.Errorf("got %d signs, want 82", count)
	}
}

// Whatever Parse takes, Encode writes back.
func FuzzParse(f *testing.F) {
	for _, seed := range []string{"(91)N01AX07(92)261202073000001003(93)2mg/mL", "(01)12345678901231(21)1", "(91)(", "(91)a(9", "(7003)"} {
		f.Add(seed)
	}
	f.Fuzz(func(t *testing.T, text string) {
		elements, err := gs1.Parse(text)
		if err != nil {
			return
		}
		symbol, hri, err := gs1.Encode(elements)
		if err != nil || hri != text || symbol[0] != gs1.Separator {
			t.Errorf("%q: got %q, %v", text, hri, err)
		}
	})
}
