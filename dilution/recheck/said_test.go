package recheck

import (
	"fmt"
	"regexp"
	"strings"
	"testing"
)

// saidRecord is an invented drug with sentences, bounds and names that hold
// digits. Its numbers are chosen so that none is ten, sixty, two or a thousand
// times another, nor by one digit unlike another: which of the known values a
// sentence takes is not judged.
const saidRecord = `# invented
[[drug]]
name = "other"
note = "77 mg of another drug"
  [[drug.presentation]]
  id = "a"
  amount = "78 mg"

[[drug]]
name = "invented"
atc = "N01AX07"
caution = [
  { text = "Not for the \"frail\":\tone dose lasts 17 to 35 h \u2013 see G5.", source = "ETO1" },
  { text = 'Filter of 5 micrometres \ none', source = "SMPC-MG" }, # "79 mg" is only a remark
]
note = """
First line, 13 days,
second \
   line."""
never = { reason = "verified 2026-05-04" }

  [[drug.presentation]]
  id = "ampoule 32.9 mg in 4.7 mL"
  amount = "32.9 mg"
  volume = "4.7 mL"
  assay = { value = "7 %", source = "BP-ADR" }

  [[drug.dose]]
  age_from = "65 years"
  usual_low = { value = "0.23 mg/kg", source = "ETO1" }
  usual_high = { value = "0.37 mg/kg", source = "ETO1" }
  hard_high = { value = "3500 microgram", source = "ETO1" }
  total_max = "0.41 mg/kg/min"

  [drug.more]
  share = "31 mmol"

[sources.ETO1]
title = "invented, page 90 mg"
`

// saidPlan is an invented syringe, worked by hand: 2.198 mg at 7 mg/mL is 0.314 mL,
// drawn as 0.3 mL in a 2 mL barrel: 14/314 = 4.4586 % less; tolerance 1.5 % of
// 2 mL and 2 % of 0.3 mL = 0.036 mL (ISO 7886-1:1993, table 1); 2.1 mg in 50 mL
// is 42 micrograms/mL; 0.05 microgram/kg/min at 72 kg is 216 / 42 = 36/7 =
// 5.142857 mL/h, on the step 5.1: 5/6 % less; 5.1 x 42 / (60 x 72) = 0.04958;
// 50 mL at 5.1 mL/h last 9 h 48.2 min.
func saidPlan(t testing.TB, rows ...string) Stated {
	t.Helper()
	var b strings.Builder
	b.WriteString(`container.amount = 32.9 mg
container.volume = 4.7 mL
container.count = 1
method = make up to
drug.volume = 0.3 mL
drug.step = 0.06 mL
drug.barrel = 2 mL
drug.wanted = 0.314 mL
drug.moved = 4.46 % less
diluent.volume = 49.7 mL
final.volume = 50 mL
concentration = 42 micrograms/mL
weight.actual = 72 kg
rate.weight.by = actual
rate.weight = 72 kg
rate.step = 0.3 mL/h
start.dose = 0.05 micrograms/kg/min
start.rate = 5.1 mL/h
start.flow = 5.14 mL/h
start.moved = 0.833 % less
start.delivered = 0.0496 micrograms/kg/min
run.time = 9 h 48 min
prepared = 30 Nov 2026 14:15
prepared.offset = +01:00
use.hours = 41 h
use.by = 02 Dec 2026 07:15
use.by.offset = +01:00
`)
	for i, row := range rows {
		name := Row(Said, i+1, "text")
		if rest, ok := strings.CutPrefix(row, "bound: "); ok {
			name, row = Row(Bound, i+1, "text"), rest
		}
		fmt.Fprintf(&b, "%s = %s\n", name, row)
	}
	return Stated{
		Syringe: "12 invented", Drug: "invented", Presentation: "ampoule 32.9 mg in 4.7 mL", Record: []byte(saidRecord),
		Asked: list(t, "order", `method = make up to
amount = 2.198 mg
final.volume = 50 mL
drug.step = 0.06 mL
drug.barrel = 2 mL
weight.actual = 72 kg
start.dose = 0.05 mcg/kg/min
rate.step = 0.3 mL/h
stock = a4-65`),
		Figures: list(t, "draw-up", b.String()),
	}
}

// sentences are right ones; the words are in the manner of the tool's own.
var sentences = []string{
	"0.314 mL is moved to the nearest graduation, 0.3 mL: 4.46 % less than asked",
	"0.3 mL is under a fifth of the 2 mL barrel; it may be off by 0.036 mL",
	"dose 0.23 mg/kg is less than usual (induction, from 65 years)",
	"nobody has verified these figures: dose 0.37 mg/kg and dose 3500 micrograms",
	"nobody has verified these figures: dose 0.37 mg/kg and dose 3,500 micrograms.",
	"the label of syringe 12, Invented, does not fit a4-65 …",
	"rounding to the pump's step changes the start dose by 0.833 %; it gives 0.0496 microgram/kg/min",
	"plus or minus 7 % is assumed",
	"between 0.23 and 0.37 mg/kg; 17 to 35 h; 0.23–0.37 mg/kg",
	"the syringe is empty after 9 h 48 min, at 42 micrograms/mL",
	"2.198 mg was asked of ampoule 32.9 mg in 4.7 mL (5.14 mL/h)",
	"use by 02 Dec 2026 07:15, verified 2026-05-04",
	"a pump at 5.1\u00a0mL/h for 72 kg",
	"31 mmol, at most 0.41 mg/kg/min",
	"bound: 0.37 mg/kg",
	"bound: 0.23 to 0.37 mg/kg",
	"bound: 3,500 micrograms",
	"bound: 3.5 mg",
	"bound: from 65 years",
}

// Sentences as the tool writes them, as the record has them, and fixed ones.
func TestTrueSentencesPass(t *testing.T) {
	agrees(t, "the plan alone", saidPlan(t))
	agrees(t, "all sentences", saidPlan(t, sentences...))
	for _, row := range []string{
		"Not for the \"frail\": one dose lasts 17 to 35 h – see G5.",
		"Filter of 5 micrometres \\ none",
		"First line, 13 days, second line.",
		"at the start rate it would still be running after its use-by time",
		"the volume of the powder itself is taken as nothing, as its source does",
		"below 1 mL/h a syringe pump may take many minutes to begin delivering",
		"below 1 mL/h a syringe pump may take many minutes to begin delivering; 0.3 mL/h is the pump's step",
		"the reading tolerance is that of ISO 7886-1, table 1 (rule R9); source ETO1, SMPC-MG; drug N01AX07; offset +01:00",
		"layout after ISO 26825:2020, 5.2 to 5.4",
		"made on 2026-11-30 at 14:15 or 30 Nov 2026",
		"1 ampoule holds 32.9 mg",
		"given in mg/m² or kg/m²",
		"bound: as high as the source says",
	} {
		agrees(t, row, saidPlan(t, row))
	}
}

var quantityInText = regexp.MustCompile(`[0-9]+(,[0-9]{3})*(\.[0-9]+)?`)

// saidAlterations changes every number by its last digit and by factors, every
// digit to every other, and every unit.
func saidAlterations(text string) []string {
	out := alteredUnits(strings.NewReplacer(":", " :", ",", " ,", ";", " ;", ")", " )").Replace(text))
	for _, at := range quantityInText.FindAllStringIndex(text, -1) {
		front, number, back := text[:at[0]], text[at[0]:at[1]], text[at[1]:]
		for _, n := range alteredNumbers(number) {
			out = append(out, front+n+back)
		}
		for i := range number {
			if number[i] < '0' || number[i] > '9' {
				continue
			}
			for d := '0'; d <= '9'; d++ {
				if byte(d) != number[i] {
					out = append(out, front+number[:i]+string(d)+number[i+1:]+back)
				}
			}
			out = append(out, front+number[:i+1]+number[i:]+back)
		}
	}
	return out
}

// Every alteration of every number and unit is caught, at its own row.
func TestSentenceAlterations(t *testing.T) {
	tried := 0
	for _, row := range sentences {
		for _, altered := range saidAlterations(row) {
			s := saidPlan(t, altered)
			c := newCheck(s)
			name := s.Figures[len(s.Figures)-1].Name
			c.checkOne(name)
			tried++
			if len(c.faults) == 0 {
				t.Errorf("passed: %q -> %q", row, altered)
			}
		}
	}
	t.Logf("%d alterations tried", tried)
}

// Sentences that must not pass, each for its own reason.
func TestSentencesRefused(t *testing.T) {
	for _, row := range []string{
		" ", "bound:  ", strings.Repeat("0.3 mL ", mostSentence/7+1),
		"it may be off by 0.0360 mL",                           // no printed style
		"0.3mL", "0.3\u00a0 .mL", ".3 mL", "0.3. mL", "0,3 mL", // unit or point not where they belong
		"-0.3 mL", "+0.3 mL", "\u22120.3 mL", "00.3 mL", "3/10 mL", "½ mL", "٣ mL", "3e-1 mL",
		"72 lb", "72 st", "0.3 cc", "1 mEq", "1 L of it", "1 IU", // units that nobody stated
		"72", "0.3", "42", // a quantity without its unit
		"1 mL",                                               // a count with a unit
		"syringe 13", "12 syringes", "sheet 12", "one of 12", // the syringe's number elsewhere
		"a4-66", "b4-65", "G6", "ISO 7886-2", "ISO 9001", "R20", "R0", "ETO2", "N01AX08", "+02:00",
		"77 mg", "78 mg", "79 mg", "90 mg", // of another drug, of a remark, of the sources
		"use by 02 Dec 2026 14:15", "02 Dec 2027", "2 Dec 2026", "2026-12-03", "07:16", "2026-02-30", "Dec 2026",
		"below 2 mL/h a syringe pump may take many minutes to begin delivering",
		"below 1 mL/h a syringe pump may take many minutes to begin delivering 5 mL",
		"as below 1 mL/min a syringe pump may take many minutes to begin delivering",
		"layout after ISO 26825:2020, 5.2 to 5.45",
		"layout after ISO 26825:2020, 5.2 to 5.4.1",
		"Not for the \"frail\": one dose lasts 17 to 36 h – see G5.",
		"slip 306 mL/h",
		"bound: 72 kg", "bound: 0.3 mL", "bound: 1", "bound: 35 mg/kg", "bound: 0.37 mg/kg/h", "bound: 0.37 to 41 mg/kg", "bound: 65", "bound: 65 months",
	} {
		s := saidPlan(t, row)
		disagreesAt(t, fmt.Sprintf("%.80q", row), s, s.Figures[len(s.Figures)-1].Name)
	}
}

// The reading tolerance passes only where barrel and volume are printed, and a
// sentence about the record only where the record can be read.
func TestSentencesNeedTheirSources(t *testing.T) {
	row := "it may be off by 0.036 mL"
	said1 := Row(Said, 1, "text")
	agrees(t, row, saidPlan(t, row))
	disagreesAt(t, "no barrel", saidPlan(t, row).without(DrugBarrel), said1)
	s := saidPlan(t, "dose 0.37 mg/kg")
	agrees(t, "with its record", s)
	s.Record = []byte(strings.Replace(saidRecord, "13 days,", `13 days\q,`, 1))
	disagreesAt(t, "an escape that does not exist", s, said1)
	s = saidPlan(t, "bound: 0.37 mg/kg")
	s.Drug = "nobody"
	disagreesAt(t, "no record", s, Row(Bound, 1, "text"))
	s = saidPlan(t, "a4-65")
	s.Asked = s.Asked[:len(s.Asked)-1]
	disagreesAt(t, "stock not asked", s, said1)
}

// The sign between thousands belongs to the house style, not to the record: a
// sentence may carry the house's own. The figures stay the record's.
func TestSentencesMayGroupThousands(t *testing.T) {
	for text, want := range map[string]string{
		"Not more than 1000 mL in 24 h.":           "Not more than 1000 mL in 24 h.",
		"Not more than 1,000 mL in 24 h.":          "Not more than 1000 mL in 24 h.",
		"Not more than 1\u00a0000 mL":              "Not more than 1000 mL",
		"1,000, 5\u202f000 and 1,250,000 units/mL": "1000, 5000 and 1250000 units/mL",
		"1,2345 units":                             "1,2345 units",
		"1.500,250 mL, 3,7 and 12,34":              "1.500,250 mL, 3,7 and 12,34",
	} {
		if got := unseparated(text); got != want {
			t.Errorf("%q: got %q, want %q", text, got, want)
		}
	}
}
