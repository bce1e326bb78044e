package gs1

import (
	"slices"
	"strings"
	"testing"
)

// GS1 General Specifications, figure of the element strings with predefined
// length: the first two digits give the length of identifier and value, and no
// separator is needed after them. 04, 14, 18 and 19 are kept for later use.
func TestPredefinedLengths(t *testing.T) {
	lengths := map[string]int{
		"00": 20, "01": 16, "02": 16, "03": 16, "04": 18, "11": 8, "12": 8, "13": 8, "14": 8, "15": 8, "16": 8, "17": 8, "18": 8, "19": 8,
		"20": 4, "31": 10, "32": 10, "33": 10, "34": 10, "35": 10, "36": 10, "41": 16,
	}
	for _, e := range table {
		shortest, longest := e.span()
		want, predefined := lengths[e.low[:2]]
		if e.predefined != predefined {
			t.Errorf("%s: got predefined %v, want %v", e.low, e.predefined, predefined)
		}
		if predefined && (shortest != longest || len(e.low)+longest != want) {
			t.Errorf("%s: got %d to %d signs, want %d with the identifier", e.low, shortest, longest, want)
		}
	}
}

// No identifier is the beginning of another, or a code could be cut in two ways;
// the table is sorted, which find relies on; every checker is known; what may be
// absent or vary stands at the end.
func TestTable(t *testing.T) {
	known := append([]string{"csum", "yymmd0", "yymmdd", "yyyymmdd", "hhmi", "hh", "mi", "ss"}, unjudged...)
	met := map[string]bool{}
	for i, e := range table {
		if i > 0 && table[i-1].high >= e.low || e.low > e.high || len(e.low) != len(e.high) {
			t.Errorf("%s to %s: not in order", e.low, e.high)
		}
		for n := 1; n < len(e.low); n++ {
			if find(e.low[:n]) != nil {
				t.Errorf("%s begins with the identifier %s", e.low, e.low[:n])
			}
		}
		for j, p := range e.parts {
			last := j == len(e.parts)-1
			if p.shortest != p.longest && !last || p.optional && !last && !e.parts[j+1].optional {
				t.Errorf("%s: component %d varies or may be absent, and more follows", e.low, j+1)
			}
			for _, c := range p.checks {
				met[c] = true
				if !slices.Contains(known, c) {
					t.Errorf("%s: the checker %q is not known", e.low, c)
				}
			}
		}
		for _, pattern := range append(slices.Clone(e.excludes), strings.FieldsFunc(strings.Join(e.requires, ","), func(r rune) bool { return r == ',' || r == '+' })...) {
			if !slices.ContainsFunc(table[:], func(o entry) bool { return matches(o.low, pattern) || matches(o.high, pattern) }) {
				t.Errorf("%s: %q names no identifier", e.low, pattern)
			}
		}
	}
	for _, c := range known {
		if !met[c] {
			t.Errorf("the checker %q is in no line of the table", c)
		}
	}
}

func TestFind(t *testing.T) {
	for ai, title := range map[string]string{
		"00": "SSCC", "01": "GTIN", "17": "USE BY or EXPIRY", "235": "TPX", "3103": "NET WEIGHT (kg)", "3105": "NET WEIGHT (kg)",
		"7003": "EXPIRY TIME", "91": "INTERNAL", "99": "INTERNAL", "710": "NHRN PZN", "8017": "GSRN - PROVIDER",
	} {
		if got := Title(ai); got != title {
			t.Errorf("%s: got %q, want %q", ai, got, title)
		}
	}
	for _, ai := range []string{"", "0", "04", "14", "23", "3106", "100", "9", "999", "7", "70", "7099", "x1"} {
		if e := find(ai); e != nil {
			t.Errorf("%q: got %v, want no entry", ai, e)
		}
	}
}

// The unit tests of the checkers csum, yymmd0 and yymmdd in the repository of
// the GS1 syntax dictionary, and the place of each fault. Its 82 signs are
// counted in TestEightyTwoSigns; 39 signs: digits, capitals, # - /.
func TestCheckDigits(t *testing.T) {
	for _, good := range []string{"02345673", "416000336108", "1234567890128", "12345678901231", "123456789012345675"} {
		if f := judge("csum", good); f != nil {
			t.Errorf("%s: got %v", good, f)
		}
	}
	for _, bad := range []string{"12345673", "416000336109", "1234567890129", "12345678901232", "123456789012345670"} {
		if f := judge("csum", bad); f == nil || f.Kind != WrongDigit || f.offset != len(bad)-1 {
			t.Errorf("%s: got %v, want a wrong check digit at the end", bad, f)
		}
	}
	count := 0
	for c := range rune(0x250) {
		if set39.holds(c) {
			count++
		}
	}
	if count != 39 {
		t.Errorf("got %d signs, want 39", count)
	}
}

func TestDays(t *testing.T) {
	good := []string{
		"000606", "250606", "500606", "750606", "990606", "200131", "200229", "200331", "200430", "200531", "200630", "200731", "200831",
		"200930", "201031", "201130", "201231", "210228", "220228", "230228", "240229", "000229", "040229", "960229",
	}
	month := []string{"200010", "201310", "209910"}
	day := []string{
		"200132", "200230", "200332", "200431", "200532", "200631", "200732", "200832", "200931", "201032", "201131", "201232",
		"210229", "220229", "230229", "240230", "000230", "040230", "960230",
	}
	for _, checker := range []string{"yymmd0", "yymmdd"} {
		for _, d := range good {
			if f := judge(checker, d); f != nil {
				t.Errorf("%s: %s: got %v", checker, d, f)
			}
		}
		for at, list := range map[int][]string{2: month, 4: day} {
			for _, d := range list {
				if f := judge(checker, d); f == nil || f.Kind != Moment || f.offset != at {
					t.Errorf("%s: %s: got %v, want a fault at %d", checker, d, f, at)
				}
			}
		}
	}
	if judge("yymmd0", "200600") != nil || judge("yymmdd", "200600") == nil {
		t.Error("day 00 stands for the month in yymmd0 and nowhere else")
	}
	for value, at := range map[string]int{"2400": 0, "2359": -1, "0000": -1, "2360": 2, "9900": 0} {
		f := judge("hhmi", value)
		if (f == nil) != (at < 0) || f != nil && f.offset != at {
			t.Errorf("hhmi %s: got %v", value, f)
		}
	}
	// 1900 was no leap year, 2000 was.
	if judge("yyyymmdd", "20000229") != nil || judge("yyyymmdd", "19000229") == nil {
		t.Error("leap years of four digits")
	}
}

// GS1 General Specifications, determination of the century in dates: 49 years
// back, 50 ahead.
func TestYear(t *testing.T) {
	for _, c := range []struct{ digits, now, want int }{
		{26, 2026, 2026}, {0, 2026, 2000}, {76, 2026, 2076}, {77, 2026, 1977}, {99, 2026, 1999}, {25, 2026, 2025},
		{49, 2000, 2049}, {50, 2000, 2050}, {51, 2000, 1951}, {49, 1999, 2049}, {50, 1999, 1950}, {0, 1999, 2000},
		{10, 2060, 2110}, {11, 2060, 2011}, {0, 2050, 2100}, {1, 2050, 2001},
	} {
		if got := Year(c.digits, c.now); got != c.want {
			t.Errorf("%02d in %d: got %d, want %d", c.digits, c.now, got, c.want)
		}
	}
}
