package recheck

import (
	"maps"
	"slices"
	"strings"
	"testing"
)

// Whatever printedNumber accepts is written back, group marks aside, letter for
// letter.
func FuzzPrintedNumber(f *testing.F) {
	for _, s := range []string{"0", "7.2", "1,000", "12\u202f345.678", "1\u00a0000", "05", "1e3", ".5", "5."} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, text string) {
		v, err := printedNumber(text)
		if err != nil {
			return
		}
		plainText := strings.NewReplacer(",", "", "\u202f", "", "\u00a0", "").Replace(text)
		if got := decimal(v, mostDigits); got != plainText {
			t.Errorf("%q read back as %q", text, got)
		}
	})
}

// Printed and typed quantities: nothing panics, and what paper may show reads
// the same when typed without group marks.
func FuzzQuantity(f *testing.F) {
	for _, s := range []string{"7.2 mL/h", "0.1 micrograms/kg/min", "5,000 units", "0.3 mg/kg lean", "10 %", "4 mmol/g", "0.5 µg"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, text string) {
		v, _, err := readTyped(text)
		if err == nil && (v.lack != "" || v.den.Sign() <= 0 || v.num.Sign() < 0) {
			t.Errorf("typed %q gives %v", text, v)
		}
		r, err := readPrinted(text)
		if err != nil {
			return
		}
		if r.unit.sign() <= 0 || r.whole.den.Sign() <= 0 {
			t.Errorf("%q gives %v", text, r)
		}
		w, _, err := readTyped(strings.NewReplacer(",", "", "\u202f", "", "\u00a0", "").Replace(text))
		if err != nil || w.dim != r.whole.dim || w.against(r.whole) != 0 {
			t.Errorf("%q is another quantity when typed: %v", text, err)
		}
	})
}

// Any record and any figure: nothing panics, and a set that passes is covered.
func FuzzCheck(f *testing.F) {
	f.Add("[[drug]]\nname = \"x\"\n[[drug.presentation]]\nid = \"a\"\namount = \"1 mg\"\n", ContainerAmount, "1 mg")
	f.Add("", Row(Ladder, 3, "rate"), "1 mL/h")
	f.Add("[[drug]]\nname = 'x'", Row(Code, 1, "text"), "(91)N01AX07(92)261202073000001003(93)2mg/mL")
	f.Add("[[drug]]\nname = \"x\"\n[[drug.presentation]]\nid = \"a\"\nadd = \"1 mL\"\n[[drug.presentation]]\nid = \"b\"", Row(Pack, 2, "presentation"), "b")
	f.Add(otherRecord, Row(Pack, 999999999, "count"), "2")
	f.Add(otherRecord+pairRecord, OtherDrug, "x")
	f.Add(pairRecord, TakenVolume, "0.1 mL")
	f.Add("", IntermediateUseBy, "01 Dec 2026 07:30")
	f.Add("", UsableTime, "9 h 25 min")
	f.Add("", DoseCount, "4")
	f.Add("", RuleRate, "1 microgram/kg/min")
	f.Fuzz(func(t *testing.T, record, name, text string) {
		s := Stated{Syringe: "f", Drug: "x", Presentation: "a", Record: []byte(record), Figures: []Figure{{"label", name, text}}, Asked: []Figure{{"order", name, text}}}
		if strings.HasPrefix(name, "other.") {
			s.OtherDrug, s.OtherPresentation, s.OtherRecord = "second invented", "b", s.Record
		}
		passed, err := Check(s)
		if (err == nil) != passed.Covers(s.Figures) {
			t.Errorf("error %v, covered %v", err, passed.Covers(s.Figures))
		}
	})
}

// Any text for any figure of a complete plan: nothing panics, and none passes but
// the figure's own quantity.
func FuzzPlan(f *testing.F) {
	plans := furtherPlans(f)
	kinds := slices.Sorted(maps.Keys(plans))
	for i, text := range []string{"0.1 mL", "2", "100 micrograms", "nothing", "6.98 % less", "ampoule 20 mg in 2 mL", "4 h 33 min", "second invented", "10 000 mL", "1 L"} {
		f.Add(uint(i), uint(7*i), text)
	}
	f.Fuzz(func(t *testing.T, plan, figure uint, text string) {
		s := plans[kinds[plan%uint(len(kinds))]]
		old := s.Figures[figure%uint(len(s.Figures))]
		if _, err := Check(s.with(old.Name, text)); err == nil && text != old.Text && !sameFigure(": "+old.Text+" -> "+text) {
			t.Errorf("%s: %q passes for %q", old.Name, text, old.Text)
		}
	})
}

// Any sentence: nothing panics, a text confirms the figures that it holds itself,
// and nothing at all confirms a sentence exactly when it holds no figure.
func FuzzSentence(f *testing.F) {
	for _, s := range []string{"0.3 mL is under a fifth of the 2 mL barrel", "9 h 48 min", "6 to 8 h", "0.1–0.2 mg/kg", "01 Dec 2026 07:30",
		"2026-12-01", "a4-65, ISO 7886-1", "1,000\u00a0mL", "½ 00.3 mg", "3. mL", "10.0 mg", "0.3 mg/kg lean", "0\f%", "0 %\v"} {
		f.Add(s)
	}
	none := func(reading) bool { return false }
	f.Fuzz(func(t *testing.T, text string) {
		if len(text) > mostSentence {
			return
		}
		k := &known{words: map[string]bool{}, printed: none}
		k.learn(text)
		list := tokens(text)
		for _, tok := range list {
			if tok.kind < withUnit || tok.kind > wordWithDigits || tok.kind == withUnit && tok.unit.sign() <= 0 {
				t.Errorf("%q: token %+v", text, tok)
			}
			if !k.knows(tok) {
				t.Errorf("%q does not know its own %+v", text, tok)
			}
		}
		nothing := &known{words: map[string]bool{}, printed: none}
		if (nothing.confirm(text, "") == nil) != (len(list) == 0) {
			t.Errorf("%q holds %d figures, yet nothing confirms it, or refuses it without one", text, len(list))
		}
	})
}

// Any record: the reader of texts comes to an end, and takes nothing from a
// piece that it has not understood.
func FuzzTexts(f *testing.F) {
	for _, s := range []string{saidRecord, invented, otherRecord, pairRecord, "\n[[mix]]\n[[mix]]\na = [\"invented\", 'second invented'", "[[drug]]\na = \"\\u00e9\"", "[[drug]]\na = \"\"\"\\\n b\"\"\"", "[[drug]]\na = '''x''' ] }", "  [[drug]]\n[[drug]]\nb = \"2\""} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, text string) {
		drugs := readBlocks(text)
		for i := range drugs {
			pairTexts([][]byte{[]byte(text), []byte(text)}, "invented", "second invented")
			texts, ok := place{piece: text, nth: i, of: len(drugs)}.texts()
			if !ok && texts != nil {
				t.Errorf("%q: texts of a piece that was not understood", text)
			}
			for _, s := range texts {
				if !strings.Contains(text, "\\") && !strings.Contains(text, s) {
					t.Errorf("%q: %q does not stand in it", text, s)
				}
			}
		}
	})
}
