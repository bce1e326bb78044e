package layouts_test

import (
	"slices"
	"strings"
	"testing"

	"drawup/labels"
	"drawup/labels/sheets"
	"drawup/layouts"
	"drawup/layouts/ink"
)

// sizesOf are the texts of a page with the sizes they are set in.
func sizesOf(p ink.Page) map[string]ink.Text {
	out := map[string]ink.Text{}
	for _, m := range p.Marks {
		if text, ok := m.(ink.Text); ok {
			out[strings.ReplaceAll(text.String, "\u00a0", " ")] = text
		}
	}
	return out
}

// The volume to draw is as large as the drug's name and ends at the right
// edge; the concentration and what becomes of the volume stand below, smaller.
func TestHeadOfADrawUpSheet(t *testing.T) {
	r := runOf(t, sheetOrder)
	pages, _ := r.placed(t, "draw-up")
	texts := map[string]ink.Text{}
	for _, p := range slices.Backward(pages) { // the first page wins
		for text, mark := range sizesOf(p) {
			texts[text] = mark
		}
	}
	for _, c := range []struct{ drug, draw, concentration, then string }{
		{"Ephedrine", "draw 1 mL", "3 mg/mL", "make up to 10 mL"}, // 30 mg of 30 mg in 1 mL
		{"Remifentanil", "add 2 mL, draw 2 mL", "50 micrograms/mL", "make up to 40 mL"},
	} {
		drug, draw, conc, then := texts[c.drug], texts[c.draw], texts[c.concentration], texts[c.then]
		switch {
		case drug.Size == 0 || draw.Size != drug.Size || draw.Face != ink.Bold:
			t.Errorf("%s: got %q in %d of face %v, want it as large as the name, %d", c.drug, c.draw, draw.Size, draw.Face, drug.Size)
		case conc.Size == 0 || conc.Size >= draw.Size || then.Size != conc.Size:
			t.Errorf("%s: got %q in %d and %q in %d, want both there and smaller than %d", c.drug, c.concentration, conc.Size, c.then, then.Size, draw.Size)
		case draw.Y >= conc.Y || conc.Y != then.Y || draw.X <= conc.X || then.X <= conc.X:
			t.Errorf("%s: got draw at %d, %d, concentration at %d, %d, filling at %d, %d; want draw above, filling at the right", c.drug, draw.X, draw.Y, conc.X, conc.Y, then.X, then.Y)
		}
	}
}

// Where name and volume do not fit beside each other, or concentration and
// filling, they stand below each other; nothing is cut or laid over another.
func TestLongHeadOfADrawUpSheet(t *testing.T) {
	name := sheets.Name{Number: 1, Drug: "Neostigmine with glycopyrronium bromide", Concentration: labels.Words("2.5 mg/mL with 500 micrograms/mL of the second drug"),
		Act: labels.Words("add 2.5 mL to each, draw 12.5 mL"), Then: labels.Words("first withdraw as much from the bag; 500 mL in all")}
	list := said("")
	list[0].Parts = []sheets.Part{{Blocks: []sheets.Block{name}}}
	pages, refused := layouts.Sheets(list, map[int]allCovered{})
	if refused.Refused() {
		t.Fatal(refused)
	}
	texts := sizesOf(pages[0])
	var last ink.Micrometre
	for _, text := range []string{name.Drug, name.Act.Text(), name.Concentration.Text(), name.Then.Text()} {
		mark, ok := texts[text]
		if !ok {
			t.Errorf("got no row %q, want it whole", text)
			continue
		}
		if mark.Y-last < mark.Size {
			t.Errorf("%q: got it %d below the row before, want at least its size, %d", text, mark.Y-last, mark.Size)
		}
		last = mark.Y
	}
}
