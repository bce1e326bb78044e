package sheets_test

import (
	"os"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"testing"

	"drawup/dilution"
	"drawup/dilution/body"
	"drawup/dilution/recheck"
	"drawup/dilution/refusal"
	"drawup/labels"
	"drawup/labels/sheets"
)

// others is the order with the methods that demo lacks.
func others(t *testing.T) string {
	t.Helper()
	data, err := os.ReadFile("../../testdata/orders/harbour-bags.toml")
	if err != nil {
		t.Fatal(err)
	}
	return string(data)
}

// aside are digits that are no figure: numbers of syringes, of sources and of
// what the pump asks for.
var aside = regexp.MustCompile(`[sS]yringes? [0-9]+((, | and | to )[0-9]+)*|source [0-9]+|^[1-5]  `)

// titles are those of the sources in a file of the formulary.
var titles = regexp.MustCompile(`(?m)^title = "(.*)"$`)

// known are the words with digits that a sheet may repeat as they stand: who
// the patient is and how the weight was found, titles of sources, names of
// equations, the catalogue's sentences, what the equations say of their own
// reach; on the page of the second person all that was typed.
func known(r run, blind bool) []string {
	var out []string
	for _, p := range r.list.Plans {
		out = append(out, p.Patient.ID.Text, p.Patient.Name.Text, p.Patient.Weighed.Text, p.Order.AcceptedBy.Text, p.Order.AcceptedReason.Text, p.UseBy.Source)
		if blind {
			out = append(out, typedTexts(p)...)
		}
		for _, title := range titles.FindAllSubmatch(p.Drug.Raw, -1) {
			out = append(out, string(title[1]))
		}
		for _, c := range p.Cautions {
			out = append(out, c.Source)
			switch c.Code {
			case refusal.BodySizeOutside, refusal.LeanPlateau, refusal.AgeMissing:
				out = append(out, c.Message[1:])
			}
		}
	}
	for _, k := range []body.Kind{body.Ideal, body.Adjusted, body.Lean, body.Surface} {
		out = append(out, k.Equation())
	}
	for _, e := range refusal.All() {
		out = append(out, e.Says)
	}
	out = slices.DeleteFunc(out, func(s string) bool { return !strings.ContainsAny(s, "0123456789") })
	slices.SortFunc(out, func(a, b string) int { return len(b) - len(a) })
	return out
}

// typedTexts are the words of the order and of its patient.
func typedTexts(p dilution.Plan) []string {
	o, q := p.Order, p.Patient
	return []string{o.Doses.Text, o.Hours.Text, o.Priming.Text, o.DeadSpace.Text, o.Mixture.Text, o.Each.Text, o.Drug.Text, o.Presentation.Text, o.Indication.Text, o.Diluent.Text, o.Route.Text, o.Line.Text, o.Batch.Text, o.Expiry.Text, o.Size.Text,
		o.Dose.Text, o.Amount.Text, o.Concentration.Text, o.Volume.Text, o.Standard.Text, o.MixAmount.Text, o.MixVolume.Text, o.Method.Text, o.Start.Text, o.From.Text, o.To.Text,
		o.AcceptedBy.Text, o.AcceptedReason.Text, q.ID.Text, q.Name.Text, q.Sex.Text, q.Age.Text, q.Height.Text, q.Weight.Text, q.Weighed.Text}
}

// bare are the cells of a sheet that hold a digit, have no name, and are none
// of the words that may.
func bare(s sheets.Sheet, words []string) []string {
	var out []string
	for _, p := range s.Parts {
		for _, b := range p.Blocks {
			for _, o := range b.Lines() {
				for _, c := range o.Line {
					if c.Figure == "" && hasFigure(c.Text, words) && c.Text != ownNumber(o, p) {
						out = append(out, c.Text)
					}
				}
			}
		}
	}
	return out
}

// ownNumber is the number of the syringe that a line belongs to.
func ownNumber(o sheets.Owned, p sheets.Part) string { return strconv.Itoa(max(o.Syringe, p.Syringe)) }

func hasFigure(text string, words []string) bool {
	for _, w := range words {
		text = strings.ReplaceAll(text, w, "")
	}
	return strings.ContainsAny(aside.ReplaceAllString(text, ""), "0123456789")
}

// Rule R17: no figure is printed that the second route has not seen. Every
// cell with a digit has a name, or is one of a short list of words.
func TestEveryDigitIsAFigure(t *testing.T) {
	for _, r := range []run{papers(t, demo, leftOut), papers(t, demo, 0), papers(t, others(t), 0), shelved(t)} {
		for _, s := range r.all() {
			words := known(r, strings.Contains(s.Title, "the second person"))
			for _, cell := range bare(s, words) {
				t.Errorf("%s, %s: got %q without a name, want every figure named", s.Paper, s.Of, cell)
			}
		}
	}
}

// The test above must be able to fail.
func TestBareFiguresAreSeen(t *testing.T) {
	words := known(papers(t, others(t), 0), false)
	for text, want := range map[string]bool{"12 mL": true, "is about 43.75 kg": true, "4 of 5 mL": true, "syringe 4 holds 5 mL": true, "syringes 1, 3 to 5 and 8": false,
		"source 12, unverified": false, "3  weight": false, "floor scale": false, "weight 70 kg": true, "patient HM-01": false, "71 kg": true, "lean weight (Janmahasatian 2005)": false} {
		s := sheets.Sheet{Parts: []sheets.Part{{Syringe: 1, Blocks: []sheets.Block{sheets.Words{Line: labels.Words(text)}}}}}
		if got := len(bare(s, words)) > 0; got != want {
			t.Errorf("%q: got seen %v, want %v", text, got, want)
		}
	}
}

// The same sentence of one paper has one name; no name stands for two texts.
func TestSentencesHaveOneName(t *testing.T) {
	r := papers(t, demo, leftOut)
	said, bound := 0, 0
	for _, p := range r.list.Plans {
		texts := map[string]string{}
		for _, f := range r.figures(p.Number) {
			if old, ok := texts[f.Name]; ok && old != f.Text {
				t.Errorf("syringe %d: got %s as %q and %q, want one text", p.Number, f.Name, old, f.Text)
			}
			texts[f.Name] = f.Text
			switch {
			case strings.HasPrefix(f.Name, recheck.Said+"."):
				said++
			case strings.HasPrefix(f.Name, recheck.Bound+"."):
				bound++
			}
		}
	}
	if said < 50 || bound < 20 {
		t.Errorf("got %d sentences and %d limits with figures, want at least 50 and 20", said, bound)
	}
}

// The methods of rule R5 and doses by body surface pass the second route on
// all papers.
func TestOtherMethodsPassTheSecondRoute(t *testing.T) {
	r := papers(t, others(t), 0)
	for _, p := range r.list.Plans {
		figures := r.figures(p.Number)
		if _, err := recheck.Check(labels.Stated(p, figures)); err != nil {
			t.Errorf("syringe %d: %v", p.Number, err)
		}
	}
}

// By hand: 8 mL of 1 mg/mL added to 100 mL make 108 mL (rule R5: "add to" keeps
// the bag's fluid whole); 1 mL withdrawn from 500 mL leaves 499 mL. Mosteller
// 1987: the root of 168 x 70 / 3600 is 1.807, so 55 mg/m² are 99.55 mg by
// 1.81 m².
func TestOtherMethodsOnPaper(t *testing.T) {
	r := papers(t, others(t), 0)
	text := strings.Join(r.drawUp[0].Text(), "\n")
	inOrder(t, text, "Fetch", "bag of 100 mL glucose 5 %", "bag of 500 mL sodium chloride 0.9 %",
		"Noradrenaline", "Take a bag of 100 mL of glucose 5 %.", "Draw up 8 mL from 2 ampoules", "Add it to the full bag; the bag then holds 108 mL.", "Mix: turn the bag",
		"Oxytocin", "Withdraw 1 mL from the bag and discard it; 499 mL stay.", "the bag again holds 500 mL")
	check := strings.Join(r.check[1].Text(), "\n")
	inOrder(t, check, "body surface", "1.81 m²", "one dose, amount", "99.55 mg", "Working", "168 cm, 70 kg", "1.81 m²")
	blind := strings.Join(r.check[0].Text(), "\n")
	inOrder(t, blind, "55 mg/m2 surface", "body surface", "m²")
	cards := map[string][]string{"Noradrenaline": {"1  concentration", "2  bag", "108 mL", "3  weight", "70 kg"},
		"Oxytocin": {"2  bag", "500 mL", "3  dose rate"}, "Remifentanil": {"2  syringe", "3  body surface", "1.81 m²", "4  dose rate", "4 micrograms/m²/min"}}
	for _, s := range r.pump {
		for name, want := range cards {
			if strings.HasSuffix(s.Of, name) {
				inOrder(t, strings.Join(s.Text(), "\n"), want...)
				delete(cards, name)
			}
		}
	}
	if len(cards) > 0 {
		t.Errorf("got no card for %v, want one for each", cards)
	}
}

// What the second person must not see is not seen for these methods either.
func TestOtherBlindPagesHoldNoAnswer(t *testing.T) {
	r := papers(t, others(t), 0)
	for i, p := range r.list.Plans {
		for _, leak := range leaks(r.check[2*i], p) {
			t.Errorf("syringe %d, page for the second person: got %s, want only what was typed", p.Number, leak)
		}
	}
}
