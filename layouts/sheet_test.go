package layouts_test

import (
	"bytes"
	"fmt"
	"slices"
	"strings"
	"testing"

	"drawup/dilution"
	"drawup/dilution/formulary"
	"drawup/dilution/order"
	"drawup/dilution/recheck"
	"drawup/dilution/refusal"
	"drawup/labels"
	"drawup/labels/sheets"
	"drawup/layouts"
	"drawup/layouts/ink"
	"drawup/layouts/pdf"
	"drawup/layouts/pdf/readback"
)

// sheetOrder is invented: invented people, an invented place.
const sheetOrder = `
[session]
place = "Harbour Theatre 2 (invented)"
date = 2026-12-01
prepared = "07:30"
zone = "+00:00"
preparer = "A. Sample"
invented = true
[site]
bolus_use_by = "12 h"
infusion_use_by = "24 h"

[[patient]]
id = "HM-01"
sex = "female"
age = "82 years"
height = "158 cm"
weight = "54 kg"
weighed = "bed scale, 30 Nov 2026"
  [[patient.syringe]]
  drug = "ephedrine"
  presentation = "ampoule 30 mg in 1 mL"
  concentration = "3 mg/mL"
  volume = "10 mL"
  [[patient.syringe]]
  drug = "bupivacaine"
  presentation = "ampoule 25 mg in 10 mL"
  dose = "1 mg/kg"
  route = "infiltration"
  [[patient.syringe]]
  drug = "heparin"
  presentation = "ampoule 5000 units in 5 mL"
  dose = "5000 units"
  batch = "SAMPLE-17"
  expiry = 2027-05-31
  [[patient.infusion]]
  drug = "noradrenaline"
  presentation = "ampoule 4 mg in 4 mL"
  standard = "4 mg in 50 mL"
  diluent = "glucose 5 %"
  line = "central"
  start = "0.05 microgram/kg/min"
  from = "0.02 microgram/kg/min"
  to = "0.3 microgram/kg/min"
  [[patient.infusion]]
  drug = "remifentanil"
  presentation = "vial 2 mg"
  mix = "2 mg in 40 mL"
  diluent = "sodium chloride 0.9 %"
  start = "0.1 microgram/kg/min ideal"
  [[patient.infusion]]
  drug = "oxytocin"
  indication = "labour"
  presentation = "ampoule 5 units in 1 mL"
  mix = "5 units in 500 mL"
  method = "withdraw, then add"
  start = "2 milliunits/min"
`

// A paperRun is one order's papers and their proofs.
type paperRun struct {
	list   dilution.List
	papers map[string][]sheets.Sheet
	passed map[int]recheck.Passed
}

var paperNames = []string{"draw-up", "pump cards", "check sheets"}

func runOf(t *testing.T, text string) paperRun {
	t.Helper()
	o, faults := order.Read("demo.toml", []byte(text))
	f, err := formulary.Default()
	if err != nil {
		t.Fatal(err)
	}
	list, reasons := dilution.NewList(o, f, o.Session.Prepared.Value, nil, faults)
	if reasons.Refused() {
		t.Fatalf("the order is refused:\n%v", reasons.Refusals())
	}
	m := labels.Making{Place: o.Session.Place.Value, Preparer: o.Session.Preparer.Value, Made: "01 Dec 2026 07:30", Formulary: f.Name + " " + f.Version,
		FormularyDigest: f.Digest[:12], State: f.State(), Digest: "0a1b2c3d4e5f", Invented: o.Session.Invented}
	var facts []labels.Facts
	for _, p := range list.Plans {
		facts = append(facts, labels.FactsOf(p))
	}
	r := paperRun{list: list, passed: map[int]recheck.Passed{}, papers: map[string][]sheets.Sheet{"draw-up": sheets.DrawUp(list, facts, m),
		"pump cards": sheets.PumpCards(list, facts, m), "check sheets": sheets.CheckSheets(list, facts, m)}}
	for _, p := range list.Plans {
		var figures []recheck.Figure
		for _, name := range paperNames {
			for _, s := range r.papers[name] {
				figures = append(figures, s.FiguresOf(p.Number)...)
			}
		}
		if r.passed[p.Number], err = recheck.Check(labels.Stated(p, figures)); err != nil {
			t.Fatal(err)
		}
	}
	return r
}

// placed is the pages of one paper and its PDF file.
func (r paperRun) placed(t *testing.T, name string) ([]ink.Page, []byte) {
	t.Helper()
	pages, refused := layouts.Sheets(r.papers[name], r.passed)
	if refused.Refused() {
		t.Fatalf("%s: %v", name, refused)
	}
	var file bytes.Buffer
	if err := pdf.Write(&file, pdf.Document{Pages: pages, Title: name, Made: r.list.At}); err != nil {
		t.Fatalf("%s: %v", name, err)
	}
	return pages, file.Bytes()
}

// spaced makes all blanks and breaks of lines alike.
func spaced(s string) string {
	return strings.Join(strings.Fields(strings.ReplaceAll(s, "\u00a0", " ")), " ")
}

// Everything that a sheet says, figures above all, is on its paper as an
// independent renderer reads it. Figures of the chart and of the foot apart,
// nothing may be left out.
func TestSheetsReadBack(t *testing.T) {
	for _, text := range []string{sheetOrder, bagOrder(t)} {
		readBack(t, runOf(t, text))
	}
}

func readBack(t *testing.T, r paperRun) {
	t.Helper()
	for _, name := range paperNames {
		pages, data := r.placed(t, name)
		file := readback.Open(t, data)
		var all strings.Builder
		for i := range pages {
			for _, run := range file.Text(i + 1) {
				all.WriteString(run.Text + " ")
			}
			all.WriteString(" ")
		}
		text := strings.ReplaceAll(spaced(all.String()), " ", "")
		for _, s := range r.papers[name] {
			for _, line := range withoutChart(s).Text() {
				if line == s.Of {
					continue // stands on pages that continue only
				}
				if !strings.Contains(text, strings.ReplaceAll(spaced(line), " ", "")) {
					t.Errorf("%s, syringe %d: got no %q on paper, want it", name, s.Syringe, line)
				}
			}
			for _, n := range s.Syringes() {
				for _, f := range withoutChart(s).FiguresOf(n) {
					if !strings.Contains(text, strings.ReplaceAll(spaced(f.Text), " ", "")) {
						t.Errorf("%s, syringe %d: got no %s %q on paper, want it", name, n, f.Name, f.Text)
					}
				}
			}
		}
	}
}

// withoutChart is the sheet without its charts, which leave figures out where
// they would stand over each other.
func withoutChart(s sheets.Sheet) sheets.Sheet {
	keep := func(list []sheets.Block) []sheets.Block {
		return slices.DeleteFunc(slices.Clone(list), func(b sheets.Block) bool {
			_, chart := b.(sheets.Chart)
			return chart
		})
	}
	s.Parts = slices.Clone(s.Parts)
	for i := range s.Parts {
		blocks := keep(s.Parts[i].Blocks)
		for j, b := range blocks {
			if two, ok := b.(sheets.Beside); ok {
				blocks[j] = sheets.Beside{LeftShare: two.LeftShare, Left: keep(two.Left), Right: keep(two.Right)}
			}
		}
		s.Parts[i].Blocks = blocks
	}
	return s
}

// Section 6 of the design: page x of y, made at, by, formulary name, version,
// digest and approval state stand on every page.
func TestEveryPageHasItsFoot(t *testing.T) {
	r := runOf(t, sheetOrder)
	for _, name := range paperNames {
		pages, data := r.placed(t, name)
		file := readback.Open(t, data)
		if file.Pages() != len(pages) {
			t.Fatalf("%s: got %d pages, want %d", name, file.Pages(), len(pages))
		}
		for i := range pages {
			text := spaced(file.AllText(i + 1))
			for _, want := range []string{fmt.Sprintf("page %d of %d", i+1, len(pages)), "Made 01 Dec 2026 07:30 by A. Sample, Harbour Theatre 2 (invented)",
				"starter formulary", r.list.Formulary.Version, r.list.Formulary.Digest[:12], "not approved for use here", "0a1b2c3d4e5f", sheets.Advice, "INVENTED DEMONSTRATION"} {
				if !strings.Contains(text, want) {
					t.Errorf("%s, page %d: got no %q, want it", name, i+1, want)
				}
			}
		}
	}
}

// Nothing stands over anything else: the boxes of two texts never meet, as the
// renderer measures them, and every text keeps clear of the edge.
func TestTextsDoNotMeet(t *testing.T) {
	for _, text := range []string{sheetOrder, bagOrder(t)} {
		doNotMeet(t, runOf(t, text))
	}
}

func doNotMeet(t *testing.T, r paperRun) {
	t.Helper()
	const slack = 130 // the renderer widens a box by up to some 60 micrometres
	for _, name := range paperNames {
		pages, data := r.placed(t, name)
		file := readback.Open(t, data)
		for i, page := range pages {
			runs := file.Text(i + 1)
			for a, x := range runs {
				if x.X < ink.MM(8) || x.X+x.W > page.W-ink.MM(8)+slack || x.Y < ink.MM(8) || x.Y+x.H > page.H-ink.MM(8) {
					t.Errorf("%s, page %d: got %q in the margin of 8 mm", name, i+1, x.Text)
				}
				for _, y := range runs[a+1:] {
					if x.X+slack < y.X+y.W && y.X+slack < x.X+x.W && x.Y+slack < y.Y+y.H && y.Y+slack < x.Y+x.H {
						t.Errorf("%s, page %d: got %q over %q", name, i+1, x.Text, y.Text)
					}
				}
			}
		}
	}
}

// R16: every text is black on white, or white on black; colour stands only in
// a band beside the drug's name, narrower than 4 mm, and holds no text.
func TestSheetsReadInBlackAndWhite(t *testing.T) {
	r := runOf(t, sheetOrder)
	for _, name := range paperNames {
		pages, _ := r.placed(t, name)
		for i, page := range pages {
			for _, m := range page.Marks {
				switch m := m.(type) {
				case ink.Text:
					if m.Colour != ink.Black && m.Colour != ink.White {
						t.Errorf("%s, page %d: got %q in colour, want black or white", name, i+1, m.String)
					}
					if m.Size < 2200 {
						t.Errorf("%s, page %d: got %q with an em of %d micrometres, want 2200 or more", name, i+1, m.String, m.Size)
					}
				case ink.Rect:
					if m.Fill != nil && *m.Fill != ink.Black && *m.Fill != ink.White && m.W >= ink.MM(4) {
						t.Errorf("%s, page %d: got a coloured field %d micrometres wide, want a narrow band", name, i+1, m.W)
					}
				case ink.Line:
					if m.Colour != ink.Black {
						t.Errorf("%s, page %d: got a line in colour, want black", name, i+1)
					}
				}
			}
		}
	}
}

// The second person's page and the first of the preparer's pages of every
// syringe follow each other, each on its own page; a card's front holds its
// number and its signatures.
func TestSheetsBreakWhereTheyShould(t *testing.T) {
	r := runOf(t, sheetOrder)
	pages, data := r.placed(t, "check sheets")
	file := readback.Open(t, data)
	second := 0
	for i := range pages {
		text := spaced(file.AllText(i + 1))
		if !strings.Contains(text, "Check sheet: the second person") {
			continue
		}
		second++
		if strings.Contains(text, "continued") || !strings.Contains(text, "third person") || strings.Contains(text, "Working") {
			t.Errorf("page %d: got the second person's page in pieces or with the preparer's, want it whole and alone", i+1)
		}
		if i+1 >= len(pages) || !strings.Contains(spaced(file.AllText(i+2)), "open only after the page before is filled in") {
			t.Errorf("page %d: got no preparer's page after it, want it", i+1)
		}
	}
	if second != len(r.list.Plans) {
		t.Errorf("got %d pages for the second person, want one for each of %d syringes", second, len(r.list.Plans))
	}
	_, data = r.placed(t, "pump cards")
	front := spaced(readback.Open(t, data).AllText(1))
	for _, want := range []string{"Noradrenaline", "then it shows", "2 mL/h", "HARD LIMIT", "checked alone by, time"} {
		if !strings.Contains(front, want) {
			t.Errorf("front of the first card: got no %q, want it", want)
		}
	}
}

func TestBookmarksOfSheets(t *testing.T) {
	r := runOf(t, sheetOrder)
	_, data := r.placed(t, "pump cards")
	var titles []string
	for _, b := range readback.Open(t, data).Bookmarks() {
		titles = append(titles, b.Title)
	}
	if got, want := strings.Join(titles, "; "), "4 Noradrenaline; 5 Remifentanil; 6 Oxytocin"; got != want {
		t.Errorf("got bookmarks %q, want %q", got, want)
	}
}

// R19: the same sheets give the same bytes.
func TestSheetsAreTheSameTwice(t *testing.T) {
	r := runOf(t, sheetOrder)
	for _, name := range paperNames {
		_, a := r.placed(t, name)
		_, b := r.placed(t, name)
		if !bytes.Equal(a, b) {
			t.Errorf("%s: got two different files, want the same bytes", name)
		}
	}
}

// No ink without a second route (R17).
func TestUnprovenSheetsAreRefused(t *testing.T) {
	r := runOf(t, sheetOrder)
	none := map[int]recheck.Passed{}
	zero := map[int]recheck.Passed{}
	other := map[int]recheck.Passed{}
	for n := range r.passed {
		zero[n] = recheck.Passed{}
		other[n] = r.passed[1]
	}
	altered := r.papers["pump cards"][0]
	altered.Parts = append(slices.Clone(altered.Parts), sheets.Part{Syringe: 4, Blocks: []sheets.Block{sheets.Words{Line: labels.Line{{Text: "20 mL/h", Figure: recheck.StartRate}}}}})
	stray := altered
	stray.Parts = []sheets.Part{{Blocks: []sheets.Block{sheets.Words{Line: labels.Line{{Text: "2 mL/h", Figure: recheck.StartRate}}}}}}
	for _, c := range []struct {
		name   string
		list   []sheets.Sheet
		passed map[int]recheck.Passed
	}{
		{"no proof", r.papers["draw-up"], none}, {"an empty proof", r.papers["draw-up"], zero}, {"another syringe's proof", r.papers["pump cards"], other},
		{"one altered figure", []sheets.Sheet{altered}, r.passed}, {"a figure of no syringe", []sheets.Sheet{stray}, r.passed},
	} {
		pages, refused := layouts.Sheets(c.list, c.passed)
		if !refused.Refused() || len(pages) > 0 || !slices.Contains(refused.Codes(), refusal.RoutesDisagree) {
			t.Errorf("%s: got %d pages and %v, want routes-disagree and no page", c.name, len(pages), refused.Codes())
		}
	}
}

// said is a sheet of one paragraph without figures.
func said(text string) []sheets.Sheet {
	return []sheets.Sheet{{Paper: sheets.PaperDrawUp, Size: sheets.A4, Title: "Test", Parts: []sheets.Part{{Blocks: []sheets.Block{sheets.Words{Line: labels.Words(text)}}}}}}
}

func TestWhatCannotBeSetIsRefused(t *testing.T) {
	for _, c := range []struct {
		name string
		list []sheets.Sheet
		code refusal.Code
	}{
		{"a letter that no face has", said("patient \u75c5"), refusal.GlyphMissing},
		{"a word wider than the page", said(strings.Repeat("overlong", 40)), refusal.TextTooLong},
		{"a title wider than the page", []sheets.Sheet{{Size: sheets.A5, Title: "Pump card", Note: strings.Repeat("wide ", 40)}}, refusal.TextTooLong},
	} {
		pages, refused := layouts.Sheets(c.list, map[int]recheck.Passed{})
		if !slices.Contains(refused.Codes(), c.code) || len(pages) > 0 {
			t.Errorf("%s: got %d pages and %v, want %s and no page", c.name, len(pages), refused.Codes(), c.code)
		}
	}
}

// A long caution wraps and goes on over as many pages as it takes; not a word
// is lost, and a number stays with its unit (rule N26).
func TestLongCautionsWrap(t *testing.T) {
	var list []sheets.Caution
	for i := range 80 {
		list = append(list, sheets.Caution{Text: labels.Words(fmt.Sprintf("Caution number %d: %s", i, strings.Repeat("give 12 mL and no more than 0.5 mg in 24 h, ", 6))), Code: "dose-above-usual", Note: labels.Words("source 1")})
	}
	sheet := said("")[0]
	sheet.Parts[0].Blocks = []sheets.Block{sheets.Cautions{List: list}}
	pages, refused := layouts.Sheets([]sheets.Sheet{sheet}, map[int]recheck.Passed{})
	if refused.Refused() {
		t.Fatal(refused)
	}
	if len(pages) < 3 {
		t.Errorf("got %d pages, want at least three", len(pages))
	}
	var all []string
	for _, p := range pages {
		for _, m := range p.Marks {
			if text, ok := m.(ink.Text); ok {
				all = append(all, text.String)
				if strings.HasSuffix(text.String, " 12") || strings.HasSuffix(text.String, " 0.5") || strings.HasSuffix(text.String, " 24") {
					t.Errorf("got a row that ends %q, want number and unit together", text.String)
				}
			}
		}
	}
	text := spaced(strings.Join(all, " "))
	for i := range 80 {
		if !strings.Contains(text, fmt.Sprintf("Caution number %d:", i)) {
			t.Errorf("got no caution %d, want all 80", i)
		}
	}
	if got := strings.Count(text, "give 12 mL and no more than 0.5 mg in 24 h,"); got != 480 {
		t.Errorf("got the words %d times, want 480", got)
	}
}

// A table that runs over a page prints its head again; a row and a step are
// never split.
func TestTablesAndStepsOverPages(t *testing.T) {
	table := sheets.Table{Columns: []sheets.Column{{Head: "left head", Share: 1}, {Head: "right head", Share: 1}}}
	var steps sheets.Steps
	for i := range 70 {
		table.Rows = append(table.Rows, sheets.Row{Cells: []labels.Line{labels.Words(fmt.Sprintf("row %d begins", i)), labels.Words(strings.Repeat("word ", 30) + fmt.Sprintf("row %d ends", i))}})
		steps.List = append(steps.List, labels.Words(fmt.Sprintf("act %d begins, ", i)+strings.Repeat("word ", 40)+fmt.Sprintf("act %d ends", i)))
	}
	sheet := said("")[0]
	sheet.Parts = []sheets.Part{{Blocks: []sheets.Block{table}}, {Blocks: []sheets.Block{steps}}}
	pages, refused := layouts.Sheets([]sheets.Sheet{sheet}, map[int]recheck.Passed{})
	if refused.Refused() {
		t.Fatal(refused)
	}
	heads, whole := 0, 0
	for _, p := range pages {
		var text strings.Builder
		for _, m := range p.Marks {
			if x, ok := m.(ink.Text); ok {
				text.WriteString(x.String + " ")
			}
		}
		got := spaced(text.String())
		rows := false
		for i := range 70 {
			for _, what := range []string{"row", "act"} {
				begins, ends := strings.Contains(got, fmt.Sprintf("%s %d begins", what, i)), strings.Contains(got, fmt.Sprintf("%s %d ends", what, i))
				if begins != ends {
					t.Errorf("got %s %d over two pages, want it on one", what, i)
				}
				if begins {
					whole++
				}
				rows = rows || begins && what == "row"
			}
		}
		if has := strings.Contains(got, "left head right head"); has {
			heads++
		} else if rows {
			t.Error("got rows on a page without their head, want it again")
		}
	}
	if whole != 140 || heads < 2 {
		t.Errorf("got %d rows and steps under %d heads, want 140 under two or more", whole, heads)
	}
}
