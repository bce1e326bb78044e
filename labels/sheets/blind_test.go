package sheets_test

import (
	"regexp"
	"slices"
	"strconv"
	"strings"
	"testing"

	"drawup/dilution"
	"drawup/dilution/recheck"
	"drawup/labels"
	"drawup/labels/sheets"
)

var number = regexp.MustCompile(`[0-9][0-9., \x{a0}]*[0-9]|[0-9]`)

// plainNumbers are the numbers of a text without their groups: "1,234.5" and
// "1 234.5" both give 1234.5.
func plainNumbers(text string) []string {
	var out []string
	for _, n := range number.FindAllString(text, -1) {
		if grouped.MatchString(n) {
			n = strings.NewReplacer(",", "", " ", "", "\u00a0", "").Replace(n)
		}
		out = append(out, strings.Fields(strings.ReplaceAll(n, ",", " "))...)
	}
	return out
}

var grouped = regexp.MustCompile(`^[0-9]{1,3}([, \x{a0}][0-9]{3})+(\.[0-9]+)?$`)

// typedNumbers are the numbers that the second person may see: those of the
// order's and the patient's own words, of the container's name, and the number
// of the syringe.
func typedNumbers(p dilution.Plan) []string {
	texts := append(typedTexts(p), p.Presentation.ID)
	for _, pack := range p.Mixture.Packs {
		texts = append(texts, pack.Presentation.ID)
	}
	var out []string
	for _, t := range texts {
		out = append(out, plainNumbers(t)...)
	}
	return append(out, strconv.Itoa(p.Number))
}

// leaks are the numbers of a page that nobody typed. In whatever unit or
// spelling an answer stands, its number gives it away.
func leaks(s sheets.Sheet, p dilution.Plan) []string {
	var out []string
	typed := typedNumbers(p)
	for _, line := range s.Text() {
		for _, n := range plainNumbers(line) {
			if !slices.Contains(typed, n) {
				out = append(out, n+" in "+line)
			}
		}
	}
	return out
}

// An independent check is one whose second person sees no answer (Westbrook
// 2021: of 3,563 mandatory checks 1.0 % were independent).
func TestBlindPageHoldsNoAnswer(t *testing.T) {
	r := papers(t, demo, leftOut)
	for i, p := range r.list.Plans {
		blind := r.check[2*i]
		for _, leak := range leaks(blind, p) {
			t.Errorf("syringe %d, page for the second person: got %s, want only what was typed", p.Number, leak)
		}
		for _, n := range blind.Syringes() {
			for _, f := range blind.FiguresOf(n) {
				if n != p.Number || f.Text != p.Presentation.ID {
					t.Errorf("syringe %d: got %s %q of syringe %d on the blind page, want the name of the container alone", p.Number, f.Name, f.Text, n)
				}
			}
		}
	}
}

// answers are the figures that the second person must find alone.
var answers = []string{recheck.DrugVolume, recheck.DiluentVolume, recheck.AmountInSyringe, recheck.Concentration, recheck.WeightLean, recheck.WeightAdjusted, recheck.WeightIdeal,
	recheck.DoseAmount, recheck.DoseVolume, recheck.DoseDelivered, recheck.StartRate, recheck.StartDelivered, recheck.LowRate, recheck.HighRate, recheck.RunTime, recheck.UseBy,
	recheck.IntervalLow, recheck.IntervalHigh, recheck.LeftVolume}

func TestBlindPageHoldsNoAnswerInAnySpelling(t *testing.T) {
	r := papers(t, demo, leftOut)
	asked := 0
	for i, p := range r.list.Plans {
		typed := strings.Join([]string{p.Order.Concentration.Text, p.Order.Volume.Text, p.Order.Amount.Text, p.Order.MixAmount.Text, p.Order.MixVolume.Text, p.Presentation.ID, p.Order.Presentation.Text, p.Order.Start.Text, p.Order.From.Text, p.Order.To.Text}, "; ")
		text := strings.Join(r.check[2*i].Text(), "\n")
		for _, name := range answers {
			answer := r.facts[i].Text(name)
			if answer == "" || strings.Contains(typed, answer) {
				continue
			}
			asked++
			for _, spelling := range spellings(answer) {
				if regexp.MustCompile(`(^|[^0-9.])` + regexp.QuoteMeta(spelling)).MatchString(text) {
					t.Errorf("syringe %d: got %s as %q on the blind page, want it nowhere", p.Number, name, spelling)
				}
			}
		}
	}
	if asked < 50 {
		t.Errorf("got %d answers to look for, want at least 50", asked)
	}
}

// spellings are the ways to write a quantity: with and without groups, other
// letters, a thousand times smaller or larger units.
func spellings(s string) []string {
	out := []string{s, strings.ReplaceAll(s, ",", ""), strings.ReplaceAll(s, "mL", "ml"), strings.ReplaceAll(s, " ", "\u00a0"), strings.ReplaceAll(s, " ", ""),
		strings.ReplaceAll(s, "micrograms", "mcg"), strings.ReplaceAll(s, "micrograms", "microgram"), strings.ReplaceAll(s, "micrograms", "µg")}
	n, unit, ok := strings.Cut(s, " ")
	if !ok {
		return out
	}
	for _, pair := range [][2]string{{"microgram", "mg"}, {"mg", "g"}, {"nanogram", "microgram"}} {
		if rest, ok := strings.CutPrefix(strings.Replace(unit, pair[0]+"s", pair[0], 1), pair[0]); ok {
			out = append(out, moved(n, -3)+" "+pair[1]+rest)
		}
		if rest, ok := strings.CutPrefix(strings.Replace(unit, pair[1]+"s", pair[1], 1), pair[1]); ok {
			out = append(out, moved(n, 3)+" "+pair[0]+rest, moved(n, 3)+" "+pair[0]+"s"+rest)
		}
	}
	return out
}

// moved shifts the point of a decimal by whole places.
func moved(n string, places int) string {
	n = strings.ReplaceAll(n, ",", "")
	head, tail, _ := strings.Cut(n, ".")
	for ; places > 0; places-- {
		if tail == "" {
			tail = "0"
		}
		head, tail = head+tail[:1], tail[1:]
	}
	for ; places < 0; places++ {
		if head == "" {
			head = "0"
		}
		head, tail = head[:len(head)-1], head[len(head)-1:]+tail
	}
	head, tail = strings.TrimLeft(head, "0"), strings.TrimRight(tail, "0")
	if head == "" {
		head = "0"
	}
	if tail != "" {
		head += "." + tail
	}
	return head
}

// The two tests above must be able to fail.
func TestLeaksAreSeen(t *testing.T) {
	r := papers(t, demo, leftOut)
	p := r.list.Plans[2] // propofol by lean weight
	for _, answer := range []string{"8.8 mL", "43.8 kg", "87.6mg", "1,234.5 microgram", "12"} {
		s := sheets.Sheet{Title: "Check", Parts: []sheets.Part{{Blocks: []sheets.Block{sheets.Words{Line: labels.Words("so: " + answer)}}}}}
		if len(leaks(s, p)) == 0 {
			t.Errorf("got no leak for %q, want it seen", answer)
		}
	}
	for in, want := range map[string]string{"40": "0.04", "0.5": "0.0005", "1,250": "1.25"} {
		if got := moved(in, -3); got != want {
			t.Errorf("%s a thousandth: got %s, want %s", in, got, want)
		}
	}
	if got := moved("0.04", 3); got != "40" {
		t.Errorf("0.04 times a thousand: got %s, want 40", got)
	}
}

// What the order says, and what stands on the container, must be there: the
// second person works from it.
func TestBlindPageHoldsTheOrder(t *testing.T) {
	r := papers(t, demo, leftOut)
	for i, p := range r.list.Plans {
		text := strings.Join(r.check[2*i].Text(), "\n")
		for _, want := range []string{p.Order.Drug.Text, p.Order.Dose.Text, p.Order.Concentration.Text, p.Order.Volume.Text, p.Order.MixAmount.Text, p.Order.Start.Text,
			p.Order.Method.Text, p.Patient.ID.Text, p.Patient.Weight.Text, p.Patient.Height.Text, p.Presentation.ID, "pump rate", "agree"} {
			if want == "pump rate" && p.Infusion == nil {
				continue
			}
			if !strings.Contains(text, want) {
				t.Errorf("syringe %d: got no %q on the blind page, want it", p.Number, want)
			}
		}
	}
}

// Page two says that it is opened last, and shows the working.
func TestPreparersPage(t *testing.T) {
	r := papers(t, demo, leftOut)
	for i, p := range r.list.Plans {
		open := r.check[2*i+1]
		if !strings.Contains(open.Note, "only after") {
			t.Errorf("syringe %d: got note %q, want when it may be opened", p.Number, open.Note)
		}
		text := strings.Join(open.Text(), "\n")
		inOrder(t, text, "Working", "strength:", "drug volume:", "rounding:", "amount:", "concentration:", "balance:", "interval:", "most of it from", "use by:", "Limits checked")
	}
	// Janmahasatian 2005 for a woman of 168 cm and 70 kg, by hand:
	// BMI 70/1.68² = 24.8016; 9270 x 70 / (8780 + 244 x 24.8016) = 43.75, which
	// rounds half up to 43.8.
	text := strings.Join(r.check[5].Text(), "\n")
	inOrder(t, text, "lean weight (Janmahasatian 2005): female, 168 cm, 70 kg, is 43.75", "used: 43.8 kg")
}
