package sheets_test

import (
	"math/big"
	"os"
	"regexp"
	"strings"
	"testing"

	"drawup/dilution"
	"drawup/dilution/order"
	"drawup/dilution/recheck"
	"drawup/labels"
	"drawup/labels/sheets"
)

// shelved is the papers of the demonstration order for the demonstration shelf.
func shelved(t *testing.T) run {
	t.Helper()
	read := func(file string) []byte {
		data, err := os.ReadFile("../../testdata/" + file)
		if err != nil {
			t.Fatal(err)
		}
		return data
	}
	s, faults := order.ReadShelf("harbour.toml", read("shelves/harbour.toml"))
	if faults.Refused() {
		t.Fatal(faults)
	}
	return papersFrom(t, dilution.Bench{Shelf: &s}, string(read("orders/harbour-shelf.toml")), 0)
}

// What is planned from a shelf passes the second route on all papers.
func TestShelfPassesTheSecondRoute(t *testing.T) {
	r := shelved(t)
	for _, p := range r.list.Plans {
		if _, err := recheck.Check(labels.Stated(p, r.figures(p.Number))); err != nil {
			t.Errorf("syringe %d: %v", p.Number, err)
		}
	}
	for i, p := range r.list.Plans {
		if p.Order.Dilute.Value || p.Infusion != nil && p.Order.Hours.Given() && !p.Order.Concentration.Given() {
			continue // the page says what was chosen, since the order does not
		}
		for _, leak := range leaks(r.check[2*i], p) {
			t.Errorf("syringe %d, page for the second person: got %s, want only what was typed", p.Number, leak)
		}
	}
}

// By hand: the ready syringe; six doses of 2 mg in 12 mL, of which 1.2 mL drug;
// ampoules of two sizes for 12 mL; six hours at 2.2 mL/h and 2 mL for the line in
// 16 mL; 4 mg in 50 mL for eight hours; 0.25 mL made up to 1 mL.
func TestShelfOnPaper(t *testing.T) {
	r := shelved(t)
	text := strings.Join(r.drawUp[0].Text(), "\n")
	inOrder(t, text, "Fetch", "1 syringe, 30 mg in 10 mL", "2 ampoules, each 10 mg in 1 mL", "10.8 mL sodium chloride 0.9 %, from one bag of 100 mL",
		"ampoule 100 microgram in 2 mL; ampoule 500 microgram in 10 mL", "46 mL glucose 5 %, from one bag of 50 mL", "0.75 mL sodium chloride 0.9 %, from one ampoule of 10 mL",
		"Chosen", "syringe 30 mg in 10 mL: the order names none", "enough for 6 doses",
		"Draw up 12 mL of fentanyl from ampoule 100 microgram in 2 mL and ampoule 500 microgram in 10 mL (50 micrograms/mL)",
		"at least 6 h at the start rate, 2 mL to fill the line counted off",
		"at least 8 h at the start rate, 1.5 mL to fill the line and 0.2 mL that stay behind counted off", "standard preparation 4 mg in 50 mL",
		"100 micrograms/mL in 1 mL: the neat dose cannot be measured",
		"rule of three for 3.6 kg and no other weight: each mL/h gives 0.2 microgram/kg/min")
	if strings.Contains(text, "Empty") {
		t.Error("the sheet says when an infusion is empty")
	}
	cards := 0
	for _, s := range r.pump {
		card := strings.Join(s.Text(), "\n")
		if strings.Contains(s.Of, "Midazolam") {
			cards++
			inOrder(t, card, "Lasts", "at least 6 h at the start rate, 2 mL to fill the line counted off", "Use by")
			if strings.Contains(card, "Empty") {
				t.Error("the card gives a time to the last drop, which the line does not leave")
			}
		}
		if strings.Contains(s.Of, "Fentanyl") {
			cards++
			inOrder(t, card, "Empty", "Use by")
		}
	}
	if cards != 2 {
		t.Errorf("got %d of the two cards", cards)
	}
	blind := strings.Join(r.check[2*5].Text(), "\n")
	inOrder(t, blind, "dilute if needed", "yes", "chosen, not ordered", "dilute to 100 micrograms/mL, 1 mL in all")
}

// The steps of the draw-up sheet are enough: what they say, read by somebody who
// has nothing else and worked in fractions of the test's own, gives the
// concentration that is printed.
func TestStepsGiveTheConcentration(t *testing.T) {
	worked := 0
	for _, r := range []run{papers(t, demo, leftOut), papers(t, others(t), 0), papers(t, morning(t), 0), shelved(t)} {
		for n, steps := range stepsOf(r.drawUp[0]) {
			printed := ""
			for _, f := range r.figures(n) {
				if f.Name == recheck.Concentration {
					printed = f.Text
				}
			}
			got, ok := fromSteps(steps)
			if !ok {
				t.Errorf("syringe %d: the steps cannot be followed:\n%s", n, strings.Join(steps, "\n"))
				continue
			}
			worked++
			if !roundsTo(got, printed) {
				t.Errorf("syringe %d: the steps give %s mg, units or mmol/mL, the label says %s:\n%s", n, got.FloatString(6), printed, strings.Join(steps, "\n"))
			}
		}
	}
	if worked < 35 {
		t.Errorf("got %d syringes followed, want all", worked)
	}
}

func morning(t *testing.T) string {
	t.Helper()
	data, err := os.ReadFile("../../testdata/orders/harbour-morning.toml")
	if err != nil {
		t.Fatal(err)
	}
	return string(data)
}

// stepsOf is the steps of each syringe on a draw-up sheet.
func stepsOf(s sheets.Sheet) map[int][]string {
	out := map[int][]string{}
	var walk func(n int, blocks []sheets.Block)
	walk = func(n int, blocks []sheets.Block) {
		for _, b := range blocks {
			switch b := b.(type) {
			case sheets.Steps:
				for _, l := range b.List {
					out[n] = append(out[n], l.Text())
				}
			case sheets.Beside:
				walk(n, b.Left)
				walk(n, b.Right)
			}
		}
	}
	for _, p := range s.Parts {
		walk(p.Syringe, p.Blocks)
	}
	return out
}

var (
	quantityWords = `([0-9][0-9,]*(?:\.[0-9]+)?) (g|mg|micrograms?|nanograms?|units?|mmol|micromol)`
	strengthWords = regexp.MustCompile(`\(` + quantityWords + `/mL\)`)
	contentWords  = regexp.MustCompile(quantityWords + ` in ([0-9.,]+) mL`)
	drawnWords    = regexp.MustCompile(`Draw up ([0-9.,]+) mL`)
	upToWords     = regexp.MustCompile(`up to ([0-9.,]+) mL`)
	fullBagWords  = regexp.MustCompile(`the bag (?:then|again) holds ([0-9.,]+) mL`)
	readsWords    = regexp.MustCompile(`the syringe reads ([0-9.,]+) mL`)
)

// fromSteps is the concentration in mg, units or mmol per mL that comes of
// following the steps.
func fromSteps(steps []string) (*big.Rat, bool) {
	var strength, drawn, final *big.Rat
	for _, s := range steps {
		if m := drawnWords.FindStringSubmatch(s); m != nil {
			drawn = numberOf(m[1])
			if c := contentWords.FindStringSubmatch(s); c != nil && strings.Contains(s, "from") && !strings.Contains(s, " of fentanyl from ampoule") {
				strength = new(big.Rat).Quo(inBase(c[1], c[2]), numberOf(c[3]))
			} else if c := strengthWords.FindStringSubmatch(s); c != nil {
				strength = inBase(c[1], c[2])
			}
		}
		for _, words := range []*regexp.Regexp{upToWords, fullBagWords, readsWords} {
			if m := words.FindStringSubmatch(s); m != nil {
				final = numberOf(m[1])
			}
		}
	}
	if strength == nil || drawn == nil || final == nil {
		return nil, false
	}
	return new(big.Rat).Quo(new(big.Rat).Mul(strength, drawn), final), true
}

func numberOf(text string) *big.Rat {
	r, _ := new(big.Rat).SetString(strings.ReplaceAll(text, ",", ""))
	return r
}

// inBase is an amount in mg, units or mmol.
func inBase(text, unit string) *big.Rat {
	by := map[string]*big.Rat{"g": big.NewRat(1000, 1), "microgram": big.NewRat(1, 1000), "nanogram": big.NewRat(1, 1000000), "micromol": big.NewRat(1, 1000)}
	if x, ok := by[strings.TrimSuffix(unit, "s")]; ok {
		return new(big.Rat).Mul(numberOf(text), x)
	}
	return numberOf(text)
}

// roundsTo reports whether a printed concentration is the value, or the value
// rounded to the digits that are printed.
func roundsTo(value *big.Rat, printed string) bool {
	words := strings.Fields(strings.TrimSuffix(printed, "/mL"))
	if len(words) != 2 {
		return false
	}
	got := inBase(words[0], words[1])
	_, decimals, _ := strings.Cut(words[0], ".")
	half := inBase("1", words[1])
	for range decimals {
		half.Quo(half, big.NewRat(10, 1))
	}
	half.Quo(half, big.NewRat(2, 1))
	off := new(big.Rat).Sub(got, value)
	return off.Abs(off).Cmp(half) <= 0
}
