package gs1_test

import (
	"fmt"
	"strings"
	"testing"

	"drawup/labels/gs1"
)

func elements(s gs1.Scanned) string {
	var out []string
	for _, e := range s.Elements {
		out = append(out, fmt.Sprintf("%s=%s@%d", e.AI, e.Value, e.At))
	}
	return strings.Join(out, " ")
}

// The separator in its usual spellings, the symbology identifiers of ISO/IEC
// 15424 for GS1 symbols, blanks and line ends around. The number is that of the
// check digit tests of the GS1 syntax dictionary.
func TestScan(t *testing.T) {
	const pack = "01=12345678901231@1 17=261200@17 10=A-1@25 21=7@%d"
	for _, c := range []struct{ text, want string }{
		{"01123456789012311726120010A-1\x1d217", fmt.Sprintf(pack, 31)},
		{"01123456789012311726120010A-1<GS>217", fmt.Sprintf(pack, 34)},
		{"01123456789012311726120010A-1{gs}217", fmt.Sprintf(pack, 34)},
		{"01123456789012311726120010A-1[GS]217", fmt.Sprintf(pack, 34)},
		{"01123456789012311726120010A-1[FNC1]217", fmt.Sprintf(pack, 36)},
		{"01123456789012311726120010A-1<FNC1>217", fmt.Sprintf(pack, 36)},
		{"01123456789012311726120010A-1{FNC1}217", fmt.Sprintf(pack, 36)},
		{"01123456789012311726120010A-1^]217", fmt.Sprintf(pack, 32)},
		{"01123456789012311726120010A-1\u241d217", fmt.Sprintf(pack, 31)},
		{"01123456789012311726120010A-1\x1d217\r\n", fmt.Sprintf(pack, 31)},
		{"(01)12345678901231(17)261200(10)A-1(21)7", "01=12345678901231@2 17=261200@20 10=A-1@30 21=7@37"},
		{"(01) 12345678901231 (17) 261200 (10) A-1 (21) 7", "01=12345678901231@2 17=261200@22 10=A-1@34 21=7@43"},
		{"]d2911\x1d922", "91=1@4 92=2@8"},
		{"]C1\x1d911\x1d922", "91=1@5 92=2@9"},
		{"]Q3911", "91=1@4"}, {"]e0911", "91=1@4"}, {"]J1911", "91=1@4"},
		{"\x1d911", "91=1@2"}, {"[FNC1]911", "91=1@7"}, {"  911  ", "91=1@3"},
		{"911\x1d", "91=1@1"}, // one at the end is passed over
		{"0112345678901231\x1d17261200", "01=12345678901231@1 17=261200@18"}, // and one that is not needed
		{"(99)a(b)c", "99=a(b)c@2"},                                                       // parentheses in a value
		{"(91)N01AX07\x1d(92)1", "91=N01AX07@2 92=1@14"},                                  // both at once
		{"700326120123590112345678901231", "7003=26120123590112345678901231@1"},           // separator lost
		{"01123456789012317003" + "2612012359", "01=12345678901231@1 7003=2612012359@17"}, // last: none needed
		{"3103001750" + "0112345678901231", "3103=001750@1 01=12345678901231@11"},         // predefined, four digits
	} {
		got, faults := gs1.Scan(c.text)
		if elements(got) != c.want {
			t.Errorf("%q: got %s (%v), want %s", c.text, elements(got), faults, c.want)
		}
		if strings.HasPrefix(c.text, "7003") {
			if len(faults) == 0 {
				t.Errorf("%q: got no fault", c.text)
			}
		} else if len(faults) > 0 {
			t.Errorf("%q: got %v, want no fault", c.text, faults)
		}
	}
}

// Each fault has its rule and its place, in signs from 1.
func TestScanFaults(t *testing.T) {
	for _, c := range []struct {
		text string
		kind gs1.Kind
		at   int
	}{
		{"", gs1.Empty, 0}, {" \r\n", gs1.Empty, 0}, {"]d2", gs1.Empty, 0}, {"\x1d", gs1.Empty, 0},
		{"hello", gs1.Foreign, 1}, {"]d1911", gs1.Foreign, 1}, {"]E09521234000006", gs1.Foreign, 1}, {"(a)b", gs1.Foreign, 1}, {"(01", gs1.Foreign, 1},
		{"\ufeff911", gs1.Foreign, 1}, {"https:", gs1.Foreign, 1}, {strings.Repeat("9", 9000), gs1.Foreign, 8000},
		{"041234", gs1.Unknown, 1}, {"911\x1d041234", gs1.Unknown, 5}, {"911\x1dx", gs1.Unknown, 5}, {"(91)1(04)2", gs1.Unknown, 7},
		{"01123", gs1.Length, 6}, {"(01)1234567890123", gs1.Length, 18}, {"91", gs1.Length, 3}, {"0112345678901231(10)", gs1.Unknown, 17},
		{"0112345678901231" + "10" + strings.Repeat("A", 21), gs1.Length, 39},
		{"0112345678901232", gs1.WrongDigit, 16}, {"]d20112345678901232", gs1.WrongDigit, 19}, {"(01)12345678901232", gs1.WrongDigit, 18},
		{"0112345678901231" + "17261301", gs1.Moment, 21}, {"0112345678901231" + "17260229", gs1.Moment, 23},
		{"0112345678901231" + "70032612012460", gs1.Moment, 27}, {"(01)12345678901231(7003)2612011299", gs1.Moment, 33},
		{"91A#B", gs1.Sign, 4}, {"(93)2 mg/mL", gs1.Sign, 6}, {"932\u00b5g/mL", gs1.Sign, 4}, {"(91)a\x1db(92)1", gs1.Sign, 6},
		{"10A", gs1.Pairing, 1}, {"(91)A(21)B", gs1.Pairing, 7}, {"17261231", gs1.Pairing, 1},
		{"011234567890123137" + "5", gs1.Pairing, 1}, // 01 excludes 37, which needs 00 with 02 or 8026
		{"911\x1d911", gs1.Repeated, 5},
	} {
		_, faults := gs1.Scan(c.text)
		if len(faults) == 0 || faults[0].Kind != c.kind || faults[0].At != c.at {
			t.Errorf("%.40q: got %+v, want kind %d at %d", c.text, faults, c.kind, c.at)
			continue
		}
		if faults[0].Got == "" || faults[0].Want == "" || faults[0].Error() == "" {
			t.Errorf("%.40q: got %+v, want words", c.text, faults[0])
		}
	}
	// All that is wrong is told at once.
	if _, faults := gs1.Scan("(01)12345678901232(17)261301(21)a b"); len(faults) != 3 {
		t.Errorf("got %v, want three faults", faults)
	}
}

// Nothing panics; what is read without a fault, and stands in no value that
// reads like an identifier, can be written, and reads back the same.
func FuzzScan(f *testing.F) {
	for _, seed := range []string{
		"]d291N01AX07\x1d92261202073000001003\x1d932mg/mL", "(91)N01AX07(92)261202073000001003(93)2mg/mL", "01123456789012311726120010A-1<GS>217",
		"]C1", "(", "(01", "^]", "{GS}{GS}91\x1d", "(99)(98)", "<gs", "3103001750",
	} {
		f.Add(seed)
	}
	f.Fuzz(func(t *testing.T, text string) {
		got, faults := gs1.Scan(text)
		for _, x := range faults {
			if x.At < 0 || x.At > len([]rune(text))+1 || x.Error() == "" {
				t.Errorf("%q: got fault %+v outside the text", text, x)
			}
		}
		if len(faults) > 0 {
			return
		}
		symbol, _, err := gs1.Encode(got.List())
		if err != nil {
			if !strings.Contains(err.Error(), "reads like an identifier") {
				t.Errorf("%q: got %v from what was read without a fault", text, err)
			}
			return
		}
		again, faults := gs1.Scan(strings.ReplaceAll(string(symbol[1:]), "\xe8", "\x1d"))
		if len(faults) > 0 || len(again.Elements) != len(got.Elements) {
			t.Errorf("%q: got %v, %v, want %v", text, again, faults, got)
		}
	})
}
