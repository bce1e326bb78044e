package recheck

import (
	"strings"
	"testing"
)

// Number style: the project's printing rules (leading zero, no trailing zero,
// groups of three from 1,000, unit apart from the number).
func TestPrintedNumberStyle(t *testing.T) {
	good := []string{"0 mL", "7.2 mL/h", "0.05 mg", "999 mL", "1,000 mL", "12,345 units", "1\u202f000 mL", "1\u00a0000\u00a0000 units",
		"0.1 micrograms/kg/min", "3 mg/m²/h", "4 mmol/g", "10 %", "1.85 m²", "100 mcg/mL", "30 min", "24 h"}
	for _, text := range good {
		if _, err := readPrinted(text); err != nil {
			t.Errorf("%q: got %v, want it read", text, err)
		}
	}
	bad := []string{"", "7.2", "7.2mL", "7.2  mL", ".5 mL", "5. mL", "5.0 mL", "0.50 mL", "05 mL", "00.5 mL", "+5 mL", "-5 mL", "1e3 mL", "1000 mL",
		"1,00 mL", "1,0000 mL", "10,00,000 mL", "1,000\u202f000 mL", ",100 mL", "0,100 mL", "1/2 mL", "0x1 mL", "1_0 mL", "5 ml", "5 mcl", "5 ug", "5 \u00b5g", "5 ng", "5 IU", "5 U",
		"5 mL ", " 5 mL", "5 mL/mL", "5 mg/kg/min/h", "5 mg/", "5 /mL", "٥ mL", "1,000.0 mL", "5\u00a0mL", strings.Repeat("9", 3) + strings.Repeat(",999", 9) + " mL", "0 L"}
	for _, text := range bad {
		if _, err := readPrinted(text); err == nil {
			t.Errorf("%q: was read, want a refusal", text)
		}
	}
}

// What people may type, after the list in the design: mcg, both code points of
// µg, ng, words in full, mL and ml, m2, h hr hour, min, day.
func TestTypedWords(t *testing.T) {
	same := [][]string{
		{"100 micrograms/mL", "100 mcg/mL", "100 µg/ml", "100 μg/mL", "0.1 mg/mL", "100000 ng/mL", "0.1 milligrams/mL", "100.0 microgram/mL", "100mcg/mL"},
		{"1 mg/m²/h", "1 mg/m2/hr", "1 mg/m2/hour", "24 mg/m2/day"},
		{"6 units/kg/h", "6 unit/kg/hr", "0.1 units/kg/min"},
		{"24 h", "1 day", "1440 min", "24 hours"},
		{"2 mmol", "2000 micromol"},
	}
	for _, list := range same {
		first, _, err := readTyped(list[0])
		if err != nil {
			t.Fatal(err)
		}
		for _, text := range list[1:] {
			v, word, err := readTyped(text)
			if err != nil || word != "" || v.dim != first.dim || v.against(first) != 0 {
				t.Errorf("%q: got %v %q %v, want the same as %q", text, v, word, err, list[0])
			}
		}
	}
	if v, word, err := readTyped("0.3 mg/kg lean"); err != nil || word != "lean" || v.dim[inWeight] != -1 {
		t.Errorf("a dose with its weight: got %v %q %v", v, word, err)
	}
	for _, text := range []string{"", "mg", "1,000 mg", ".5 mg", "5. mg", "1e3 mg", "-1 mg", "5", "5 mg/kg tall", "5 mg kg", "5 ug", "5 IU", "5 mg/kg lean body"} {
		if _, _, err := readTyped(text); err == nil {
			t.Errorf("typed %q was read, want a refusal", text)
		}
	}
}

// Mass, activity, substance and body weight are never the same kind (R3, R4).
func TestKindsStayApart(t *testing.T) {
	texts := []string{"5 mg", "5 units", "5 mmol", "5 mL", "5 kg", "5 cm", "5 m²", "5 min", "5 %", "5 mg/kg", "5 mg/m²", "5 mg/h", "5 mg/mL"}
	for i, a := range texts {
		for _, b := range texts[i+1:] {
			x, err := readPrinted(a)
			y, fault := readPrinted(b)
			if err != nil || fault != nil {
				t.Fatal(a, err, b, fault)
			}
			if x.whole.dim == y.whole.dim {
				t.Errorf("%s and %s are of one kind", a, b)
			}
			if x.whole.plus(y.whole).lack == "" {
				t.Errorf("%s and %s can be added", a, b)
			}
		}
	}
}

// Worked by hand from the printing rule: exact where four significant digits
// hold it, else half up to three, to a whole number from 1,000.
func TestShortRule(t *testing.T) {
	rows := []struct {
		num, den int64
		right    string
		wrong    []string
	}{
		{120, 1, "120", []string{"121", "12"}},
		{405, 10000, "0.0405", []string{"0.041"}},
		{12345, 1000, "12.3", []string{"12.345", "12.35", "12.34", "12.4"}},
		{1235, 100, "12.35", []string{"12.4", "12.3"}},
		{125050, 10000, "12.5", []string{"12.505", "12.6"}},
		{10005, 1000, "10", []string{"10.01", "10.1", "10.005"}},
		{100500, 10000, "10.05", []string{"10.1"}},
		{625, 13, "48.1", []string{"48", "48.08", "48.2"}},
		{1, 3, "0.333", []string{"0.3333", "0.334", "0.33"}},
		{2, 3, "0.667", []string{"0.666", "0.67"}},
		{123456, 100, "1,235", []string{"1,234", "1,230", "1,234.56"}},
		{12345678, 1, "12,345,678", []string{"12,300,000"}},
		{99996, 100, "1,000", []string{"999", "999.96", "1,001"}},
		{99995, 100, "1,000", []string{"999.95", "999.9", "999"}},
		{9996, 10, "999.6", []string{"1,000"}},
		{2345, 2, "1,173", []string{"1,172", "1,172.5"}},
		{1005, 1, "1,005", []string{"1,010"}},
		{1, 1, "1", []string{"0.999", "1.01"}},
		{0, 1, "0", []string{"0.001"}},
	}
	for _, r := range rows {
		truth := pair(r.num, r.den)
		p, err := printedNumber(r.right)
		if err != nil || !isShort(p, truth) {
			t.Errorf("%d/%d: %s refused (%v)", r.num, r.den, r.right, err)
		}
		for _, w := range r.wrong {
			if p, err := printedNumber(w); err == nil && isShort(p, truth) {
				t.Errorf("%d/%d: %s passed", r.num, r.den, w)
			}
		}
	}
	if isShort(whole(0), pair(-1, 3)) || isShort(whole(1), pair(-1, 1)) {
		t.Error("a figure below zero passed")
	}
}

// Ties go up, as in the label grids of LBL-CISA (40.5 to 41, 20.25 to 20.3).
func TestRoundingIntervals(t *testing.T) {
	tenth := pair(1, 10)
	rows := []struct {
		printed, truth value
		how            rounding
		want           bool
	}{
		{pair(203, 10), pair(2025, 100), halfUp, true}, {pair(202, 10), pair(2025, 100), halfUp, false},
		{pair(203, 10), pair(20349, 1000), halfUp, true}, {pair(203, 10), pair(2035, 100), halfUp, false},
		{pair(2025, 100), pair(2025, 100), halfUp, false},
		{pair(203, 10), pair(2021, 100), upward, true}, {pair(203, 10), pair(203, 10), upward, true}, {pair(203, 10), pair(202, 10), upward, false},
		{pair(202, 10), pair(2029, 100), downward, true}, {pair(203, 10), pair(203, 10), downward, true}, {pair(202, 10), pair(203, 10), downward, false},
		{pair(203, 10), pair(203, 10), rounding(0), false},
	}
	for i, r := range rows {
		if got := roundsTo(r.printed, r.truth, tenth, r.how); got != r.want {
			t.Errorf("row %d: got %v, want %v", i, got, r.want)
		}
	}
}

// Elapsed hours are absolute (R18). In the night before 25 October 2026 the
// clocks of central Europe and of Britain go back by an hour (EU directive
// 2000/84/EC: last Sunday in October).
func TestUseByOverClockChange(t *testing.T) {
	build := func(prepared, offset, hours, until, untilOffset string) Stated {
		return stated(t, "", "", "prepared = "+prepared+"\nprepared.offset = "+offset+"\nuse.hours = "+hours+"\nuse.by = "+until+"\nuse.by.offset = "+untilOffset)
	}
	agrees(t, "Britain", build("24 Oct 2026 20:00", "+01:00", "24 h", "25 Oct 2026 19:00", "+00:00"))
	agrees(t, "written year first", build("2026-10-24 20:00", "+02:00", "24 h", "2026-10-25 19:00", "+01:00"))
	agrees(t, "leap day", build("28 Feb 2028 23:45", "+00:00", "30 min", "29 Feb 2028 00:15", "+00:00"))
	agrees(t, "year's end", build("31 Dec 2026 12:00", "+05:45", "24 h", "01 Jan 2027 12:00", "+05:45"))
	disagreesAt(t, "the clock's hour forgotten", build("24 Oct 2026 20:00", "+01:00", "24 h", "25 Oct 2026 20:00", "+00:00"), UseBy)
	disagreesAt(t, "no such day", build("28 Feb 2027 23:45", "+00:00", "30 min", "29 Feb 2027 00:15", "+00:00"), UseBy)
	disagreesAt(t, "one digit for the day", build("1 Dec 2026 07:30", "+00:00", "24 h", "02 Dec 2026 07:30", "+00:00"), Prepared, UseBy)
	disagreesAt(t, "two styles", build("2026-12-01 07:30", "+00:00", "24 h", "02 Dec 2026 07:30", "+00:00"), Prepared, UseBy)
	disagreesAt(t, "offset misread", build("01 Dec 2026 07:30", "+1:00", "24 h", "02 Dec 2026 07:30", "+01:00"), PreparedOffset, UseBy)
}

// The span until the use-by time is printed in hours and minutes; every span of
// an order or a formulary that is whole minutes has such a form. The moments
// are counted by hand.
func TestUseHoursWords(t *testing.T) {
	build := func(hours, until string) Stated {
		return stated(t, "", "", "prepared = 01 Dec 2026 07:30\nprepared.offset = +00:00\nuse.hours = "+hours+"\nuse.by = "+until+"\nuse.by.offset = +00:00")
	}
	good := map[string]string{
		"1 min": "01 Dec 2026 07:31", "45 min": "01 Dec 2026 08:15", "1 h": "01 Dec 2026 08:30", "1 h 30 min": "01 Dec 2026 09:00",
		"2 h 14 min": "01 Dec 2026 09:44", "12 h": "01 Dec 2026 19:30", "720 h": "31 Dec 2026 07:30", "1,000 h": "11 Jan 2027 23:30",
	}
	for hours, until := range good {
		agrees(t, hours, build(hours, until))
		for _, altered := range alterations(UseHours, hours) {
			disagreesAt(t, hours+" altered to "+altered, build(altered, until), UseBy)
		}
	}
	for _, hours := range []string{"90 min", "1.5 h", "1 h 0 min", "0 h 30 min", "0 min", "1 h 60 min", "30 min 1 h", "1 day", "1 h 30", "1000 h"} {
		disagreesAt(t, hours, build(hours, "01 Dec 2026 09:00"), UseHours, UseBy)
	}
}

// What was typed for the span is held against it in either form of words.
func TestUseHoursAsTyped(t *testing.T) {
	build := func(typed string) Stated {
		s := stated(t, "", "", "prepared = 01 Dec 2026 07:30\nprepared.offset = +00:00\nuse.hours = 1 h 30 min\nuse.by = 01 Dec 2026 09:00\nuse.by.offset = +00:00")
		s.Asked = []Figure{{Paper: "order", Name: UseHours, Text: typed}}
		return s
	}
	agrees(t, "typed as printed", build("1 h 30 min"))
	agrees(t, "typed in minutes", build("90 min"))
	disagreesAt(t, "typed otherwise", build("91 min"), UseHours)
	disagreesAt(t, "typed in other parts", build("1 h 31 min"), UseHours)
	disagreesAt(t, "typed as a volume", build("90 mL"), UseHours)
}

func TestRunTimeWords(t *testing.T) {
	good := map[string]int64{"9 h 25 min": 565, "45 min": 45, "9 h": 540, "0 min": 0, "1,000 h 1 min": 60001}
	for text, want := range good {
		if v, ok := readRun(text); !ok || v.bare(one(inTime)).against(whole(want)) != 0 {
			t.Errorf("%q: got %v %v, want %d min", text, v, ok, want)
		}
	}
	for _, text := range []string{"", "9", "9 h 60 min", "60 min", "9 h 0 min", "0 h 5 min", "9.5 h", "9 h 2.5 min", "9h 25min", "25 min 9 h", "9 h 25", "9 min 25 min", "9 h 25 h"} {
		if _, ok := readRun(text); ok {
			t.Errorf("%q was read, want a refusal", text)
		}
	}
}

// The code repeats its facts in GS1 company-internal identifiers 91 to 95.
func TestCode(t *testing.T) {
	build := func(concentration, code string) Stated {
		return stated(t, "amount = \"20 mg\"\nvolume = \"10 mL\"\n",
			"atc = N01AX07\nmethod = neat\nfinal.volume = 10 mL\ndrug.step = 0.5 mL\nformulary.digest = 7a83c0d1e4f5",
			`container.amount = 20 mg
container.volume = 10 mL
method = neat
drug.volume = 10 mL
drug.step = 0.5 mL
final.volume = 10 mL
amount = 20 mg
concentration = `+concentration+`
prepared = 01 Dec 2026 07:30
prepared.offset = +00:00
use.hours = 24 h
use.by = 02 Dec 2026 07:30
use.by.offset = +00:00
atc = N01AX07
serial = 00001003
code.1.text = `+code)
	}
	const full = "(91)N01AX07(92)261202073000001003(93)2mg/mL(94)20mg(95)7a83c0d1"
	agrees(t, "the full form", build("2 mg/mL", full))
	for _, wrong := range []string{
		strings.Replace(full, "(94)20mg", "(94)2mg", 1), strings.Replace(full, "(94)20mg", "(94)20ug", 1), strings.Replace(full, "(94)20mg", "(94)20mg/mL", 1),
		strings.Replace(full, "7a83c0d1", "7a83c0d2", 1), strings.Replace(full, "7a83c0d1", "7a83c0d1e", 1), strings.Replace(full, "(94)20mg", "", 1),
		full + "(96)1mg/mL", "(01)09521234000006(7003)2612020730(10)70836235(21)00001003",
	} {
		disagreesAt(t, wrong, build("2 mg/mL", wrong), "code.1.text")
	}
	agrees(t, "milligrams", build("2 mg/mL", "(91)N01AX07(92)261202073000001003(93)2mg/mL"))
	agrees(t, "the same in micrograms", build("2 mg/mL", "(91)N01AX07(92)261202073000001003(93)2000ug/mL"))
	for _, wrong := range []string{
		"(91)N01AX08(92)261202073000001003(93)2mg/mL", "(91)N01AX07(92)261202073100001003(93)2mg/mL", "(91)N01AX07(92)261202073000001004(93)2mg/mL",
		"(91)N01AX07(92)261202073000001003(93)2ug/mL", "(91)N01AX07(92)261202073000001003(93)20mg/mL", "(91)N01AX07(92)261202073000001003(93)2mg",
		"(91)N01AX07(92)261202073000001003(93)2 mg/mL", "(91)N01AX07(92)261202073000001003(93)2.0mg/mL", "(91)N01AX07(92)261202073000001003(93)02mg/mL",
		"(91)N01AX07(92)261202073000001003(93)2mg/mL(10)A", "(92)261202073000001003(91)N01AX07(93)2mg/mL", "", "(91)",
	} {
		disagreesAt(t, wrong, build("2 mg/mL", wrong), "code.1.text")
	}
}

// A site's own number must be the typed one, with a check digit that fits, and
// stand for this drug at this concentration in this volume. 952 is the GS1
// prefix for demonstrations and examples.
func TestProductCode(t *testing.T) {
	const (
		asked = "number = 9521234000006\ndrug = Invented\nconcentration = 2 mg/mL\nvolume = 10 mL"
		good  = "(01)09521234000006(7003)2612020730(10)70836235(21)00001003"
		full  = good + "(91)N01AX07(93)2mg/mL(94)20mg(95)7a83c0d1"
	)
	build := func(product, code string) Stated {
		lines := ""
		for _, l := range strings.Split(product, "\n") {
			if l != "" {
				lines += "\nproduct." + l
			}
		}
		return stated(t, "amount = \"20 mg\"\nvolume = \"10 mL\"\n",
			"atc = N01AX07\nmethod = neat\nfinal.volume = 10 mL\ndrug.step = 0.5 mL\nref = 70836235\nformulary.digest = 7a83c0d1e4f5"+lines,
			`container.amount = 20 mg
container.volume = 10 mL
method = neat
drug.volume = 10 mL
drug.step = 0.5 mL
final.volume = 10 mL
amount = 20 mg
concentration = 2 mg/mL
prepared = 01 Dec 2026 07:30
prepared.offset = +00:00
use.hours = 24 h
use.by = 02 Dec 2026 07:30
use.by.offset = +00:00
atc = N01AX07
serial = 00001003
ref = 70836235
code.1.text = `+full+`
code.2.text = `+code)
	}
	agrees(t, "number", build(asked, good))
	agrees(t, "without the run", build(asked, "(01)09521234000006(7003)2612020730(21)00001003"))
	agrees(t, "typed with 14 digits", build(strings.Replace(asked, "952", "0952", 1), good))
	agrees(t, "typed as a mixture", build(strings.Replace(asked, "2 mg/mL", "20 mg in 10 mL", 1), good))
	agrees(t, "typed per 5 mL", build(strings.Replace(asked, "2 mg/mL", "10 mg/5 mL", 1), good))
	agrees(t, "typed in per cent", build(strings.Replace(asked, "2 mg/mL", "0.2 %", 1), good))
	for _, wrong := range []string{
		strings.Replace(good, "09521234000006", "09521234000013", 1), strings.Replace(good, "2612020730", "2612020731", 1),
		strings.Replace(good, "70836235", "70836236", 1), strings.Replace(good, "00001003", "00001004", 1),
		strings.Replace(good, "(10)70836235(21)00001003", "(21)00001003(10)70836235", 1), "(01)09521234000006",
		"(91)N01AX07(92)261202073000001003(93)2mg/mL",
	} {
		disagreesAt(t, wrong, build(asked, wrong), "code.2.text")
	}
	for _, other := range []string{
		strings.Replace(asked, "Invented", "other", 1), strings.Replace(asked, "2 mg/mL", "3 mg/mL", 1), strings.Replace(asked, "10 mL", "20 mL", 1),
		strings.Replace(asked, "9521234000006", "9521234000007", 1), "",
	} {
		disagreesAt(t, other, build(other, strings.Replace(good, "00006", map[bool]string{true: "00007", false: "00006"}[strings.Contains(other, "00007")], 1)), "code.2.text")
	}
}

// The order may name the strength in the two old ways; they are worked as mass
// per volume (bupivacaine 0.5 % is 100 mg in 20 mL, key WEL-PCT; adrenaline
// 1 in 10,000 is 0.1 mg/mL, statement C04 corrected).
func TestOldStrengths(t *testing.T) {
	rows := map[string]string{"0.5 %": "5 mg/mL", "1:1000": "1 mg/mL", "1 in 10000": "100 micrograms/mL", "1:200000": "5 micrograms/mL", "8.4 %": "84 mg/mL"}
	for typed, printed := range rows {
		got, ok := readOldStrength(typed)
		want, err := readPrinted(printed)
		if !ok || err != nil || got.dim != want.whole.dim || got.against(want.whole) != 0 {
			t.Errorf("%s: got %v, want %s", typed, got, printed)
		}
	}
	for _, bad := range []string{"1:0", "2:1000", "1 in", "%", "5", "1:1,000"} {
		if _, ok := readOldStrength(bad); ok {
			t.Errorf("%q was read, want a refusal", bad)
		}
	}
}
