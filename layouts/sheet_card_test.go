package layouts_test

import (
	"fmt"
	"os"
	"slices"
	"strings"
	"testing"

	"drawup/dilution"
	"drawup/dilution/recheck"
	"drawup/dilution/refusal"
	"drawup/labels"
	"drawup/labels/sheets"
	"drawup/layouts"
	"drawup/layouts/ink"
	"drawup/layouts/pdf/readback"
)

// The shipped orders: the demonstration list, and one with the methods that it
// lacks.
func demoOrder(t *testing.T) string { return shipped(t, "harbour-morning.toml") }
func bagOrder(t *testing.T) string  { return shipped(t, "harbour-bags.toml") }

func shipped(t *testing.T, name string) string {
	t.Helper()
	data, err := os.ReadFile("../testdata/orders/" + name)
	if err != nil {
		t.Fatal(err)
	}
	return string(data)
}

// A card hangs at the pump: one page of A5 for each infusion, front only, with
// the number, the range, the signatures and the change-over block on it.
func TestEveryCardIsOnePage(t *testing.T) {
	longest := 0
	for name, text := range map[string]string{"demonstration": demoOrder(t), "bags": bagOrder(t), "three": sheetOrder} {
		r := runOf(t, text)
		pages, data := r.placed(t, "pump cards")
		cards := r.papers["pump cards"]
		if len(pages) != len(cards) || len(cards) == 0 {
			t.Fatalf("%s: got %d pages for %d cards, want one each", name, len(pages), len(cards))
		}
		file := readback.Open(t, data)
		for i, card := range cards {
			p := planOfCard(r, card)
			longest = max(longest, len(p.Infusion.Ladder))
			text := spaced(file.AllText(i + 1))
			for _, want := range []string{labels.Capital(p.Drug.LabelName(p.Style)), fmt.Sprintf("page %d of %d", i+1, len(cards)), p.Style.FlowRate(p.Infusion.Start.Rate),
				"HARD LIMIT", "STOP if it shows", "checked alone by, time", ": read its label; is the concentration the same?", "new rate, mL/h", "Notes and sources: draw-up sheet."} {
				if !strings.Contains(text, want) {
					t.Errorf("%s, %s: got no %q, want it on the card", name, card.Of, want)
				}
			}
		}
	}
	if longest < 12 {
		t.Errorf("got a ladder of at most %d rungs, want a full one of 12 to test with", longest)
	}
}

func planOfCard(r paperRun, card sheets.Sheet) dilution.Plan {
	for _, p := range r.list.Plans {
		if p.Number == card.Syringe {
			return p
		}
	}
	return dilution.Plan{}
}

// cardWith is the card of the longest name with blocks added at its end.
func cardWith(t *testing.T, r paperRun, blocks ...sheets.Block) sheets.Sheet {
	t.Helper()
	for _, card := range r.papers["pump cards"] {
		if strings.HasSuffix(card.Of, "Glyceryl trinitrate") {
			card.Parts = append(slices.Clone(card.Parts), sheets.Part{Syringe: card.Syringe, Blocks: blocks})
			return card
		}
	}
	t.Fatal("got no card of glyceryl trinitrate, want one")
	return sheets.Sheet{}
}

// warnings are cautions of about one row each.
func warnings(n int) []sheets.Caution {
	var out []sheets.Caution
	for i := range n {
		out = append(out, sheets.Caution{Text: labels.Words(fmt.Sprintf("Warning %c: read it before the pump is started.", 'A'+i)), Code: "rate-slow"})
	}
	return out
}

// R15: what does not fit on the one page of a card is refused, not cut.
func TestCardThatDoesNotFitIsRefused(t *testing.T) {
	r := runOf(t, bagOrder(t))
	card := cardWith(t, r, sheets.Cautions{List: warnings(20)})
	pages, refused := layouts.Sheets([]sheets.Sheet{card}, r.passed)
	if !slices.Contains(refused.Codes(), refusal.TextTooLong) || len(pages) > 0 {
		t.Errorf("got %d pages and %v, want text-too-long and no page", len(pages), refused.Codes())
	}
	for _, reason := range refused {
		if reason.Syringe != card.Syringe {
			t.Errorf("got a refusal of syringe %d, want it to name syringe %d", reason.Syringe, card.Syringe)
		}
	}
}

// Cautions for which a card has no room are left to the draw-up sheet, the
// last ones first, and the card says so.
func TestCautionsBeyondTheCardAreNamed(t *testing.T) {
	r := runOf(t, bagOrder(t))
	const rest = "More of these stand elsewhere."
	for _, n := range []int{1, 20} {
		card := cardWith(t, r, sheets.Cautions{List: warnings(n), Rest: rest})
		pages, refused := layouts.Sheets([]sheets.Sheet{card}, r.passed)
		if refused.Refused() || len(pages) != 1 {
			t.Fatalf("%d cautions: got %d pages and %v, want one", n, len(pages), refused)
		}
		text := pageText(pages[0])
		if got, want := strings.Contains(text, rest), n == 20; got != want {
			t.Errorf("%d cautions: got the word on the rest %v, want %v", n, got, want)
		}
		if n == 20 && (strings.Contains(text, "Warning T:") || strings.Contains(text, "Warning S:")) {
			t.Errorf("got the last cautions on a full card, want the first ones kept:\n%s", text)
		}
		if n == 1 && !strings.Contains(text, "Warning A:") {
			t.Error("got no caution, want the one that there is")
		}
	}
}

// Every page of every paper says what was left out.
func TestFootSaysWhatWasLeftOut(t *testing.T) {
	r := runOf(t, sheetOrder)
	const words = "Left out: syringes 7, 12, see draw-up sheet."
	for _, name := range []string{"pump cards", "check sheets"} {
		list := slices.Clone(r.papers[name])
		for i := range list {
			list[i].Foot.LeftOut = words
		}
		pages, refused := layouts.Sheets(list, r.passed)
		if refused.Refused() {
			t.Fatal(refused)
		}
		for i, p := range pages {
			if !strings.Contains(pageText(p), words) {
				t.Errorf("%s, page %d: got no %q, want it", name, i+1, words)
			}
		}
	}
}

func pageText(p ink.Page) string {
	var out []string
	for _, m := range p.Marks {
		if text, ok := m.(ink.Text); ok {
			out = append(out, text.String)
		}
	}
	return spaced(strings.Join(out, " "))
}

// A sentence with figures breaks at its blanks like any other; a figure alone
// does not.
func TestSentencesBreakFiguresDoNot(t *testing.T) {
	text := strings.Repeat("not more than 60 mg in all, ", 12) + "ever"
	for name, want := range map[string]bool{recheck.Row(recheck.Said, 1, "text"): true, recheck.AmountInSyringe: false} {
		sheet := said("")[0]
		sheet.Parts = []sheets.Part{{Syringe: 1, Blocks: []sheets.Block{sheets.Words{Line: labels.Line{{Text: text, Figure: name}}}}}}
		pages, refused := layouts.Sheets([]sheets.Sheet{sheet}, map[int]allCovered{1: {}})
		if refused.Refused() == want || (len(pages) == 1) != want {
			t.Errorf("%s: got %d pages and %v, want it broken %v", name, len(pages), refused.Codes(), want)
		}
	}
}

// allCovered is a proof that covers everything, to look at layout alone.
type allCovered struct{}

// Covers is always true.
func (allCovered) Covers([]recheck.Figure) bool { return true }
