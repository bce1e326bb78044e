package sheets_test

import (
	"fmt"
	"regexp"
	"slices"
	"strings"
	"testing"

	"drawup/dilution"
	"drawup/dilution/formulary"
	"drawup/dilution/order"
	"drawup/dilution/recheck"
	"drawup/labels"
	"drawup/labels/sheets"
)

// demo is an invented order: invented people, an invented place. Syringe 4 is
// one too many and is left out.
const demo = `
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
age = "38 years"
height = "168 cm"
weight = "70 kg"
weighed = "floor scale"
  [[patient.syringe]]
  drug = "ephedrine"
  presentation = "ampoule 30 mg in 1 mL"
  concentration = "3 mg/mL"
  volume = "10 mL"
  [[patient.syringe]]
  drug = "morphine"
  presentation = "ampoule 10 mg in 1 mL"
  concentration = "1 mg/mL"
  volume = "5 mL"
  diluent = "sodium chloride 0.9 %"
  [[patient.syringe]]
  drug = "propofol"
  presentation = "ampoule 200 mg in 20 mL"
  dose = "2 mg/kg lean"
  [[patient.syringe]]
  drug = "ephedrine"
  presentation = "ampoule 30 mg in 1 mL"
  concentration = "3 mg/mL"
  volume = "10 mL"
  [[patient.infusion]]
  drug = "adrenaline"
  presentation = "ampoule 2 mg in 2 mL"
  mix = "2 mg in 50 mL"
  indication = "vasopressor infusion"
  diluent = "glucose 5 %"
  line = "central"
  start = "0.1 microgram/kg/min"
  from = "0.05 microgram/kg/min"
  to = "0.45 microgram/kg/min"
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

[[patient]]
id = "HM-02"
sex = "male"
age = "44 years"
height = "178 cm"
weight = "146 kg"
estimated = true
  [[patient.syringe]]
  drug = "ephedrine"
  presentation = "ampoule 30 mg in 1 mL"
  concentration = "3 mg/mL"
  volume = "20 mL"
  [[patient.syringe]]
  drug = "alfentanil"
  presentation = "ampoule 5 mg in 10 mL"
  dose = "15 microgram/kg adjusted"
  indication = "anaesthesia, ventilated"
`

// leftOut is the syringe of demo that is left out on request.
const leftOut = 4

// A run is all papers of one order.
type run struct {
	list                dilution.List
	facts               []labels.Facts
	making              labels.Making
	drawUp, pump, check []sheets.Sheet
}

func (r run) all() []sheets.Sheet {
	return slices.Concat(r.drawUp, r.pump, r.check)
}

func papers(t *testing.T, text string, without int) run {
	t.Helper()
	return papersFrom(t, dilution.Bench{}, text, without)
}

// papersFrom is all papers of an order planned from a bench.
func papersFrom(t *testing.T, b dilution.Bench, text string, without int) run {
	t.Helper()
	o, faults := order.Read("demo.toml", []byte(text))
	f, err := formulary.Default()
	if err != nil {
		t.Fatal(err)
	}
	list, reasons := b.NewList(o, f, o.Session.Prepared.Value, map[int]bool{without: true}, faults)
	if reasons.Refused() {
		t.Fatalf("the order is refused:\n%v", reasons.Refusals())
	}
	r := run{list: list, making: labels.Making{Place: o.Session.Place.Value, Preparer: o.Session.Preparer.Value, Made: "01 Dec 2026 07:30",
		Formulary: f.Name + " " + f.Version, FormularyDigest: f.Digest[:12], State: f.State(), Digest: "abcdef", Invented: o.Session.Invented}}
	for _, p := range list.Plans {
		r.facts = append(r.facts, labels.FactsOf(p))
	}
	r.drawUp = sheets.DrawUp(list, r.facts, r.making)
	r.pump = sheets.PumpCards(list, r.facts, r.making)
	r.check = sheets.CheckSheets(list, r.facts, r.making)
	return r
}

// figures is every figure of syringe n on all papers.
func (r run) figures(n int) []recheck.Figure {
	var out []recheck.Figure
	for _, s := range r.all() {
		out = append(out, s.FiguresOf(n)...)
	}
	return out
}

// The second route works every figure of every paper again (R17), from the
// printed words alone; it shares no code with the first.
func TestEveryFigurePassesTheSecondRoute(t *testing.T) {
	r := papers(t, demo, leftOut)
	for _, p := range r.list.Plans {
		figures := r.figures(p.Number)
		passed, err := recheck.Check(labels.Stated(p, figures))
		if err != nil {
			t.Errorf("syringe %d: %v", p.Number, err)
		}
		if !passed.Covers(figures) {
			t.Errorf("syringe %d: got figures that are not covered", p.Number)
		}
	}
	for _, s := range r.all() {
		for _, n := range s.Syringes() {
			if n < 1 || n > 9 || n == leftOut {
				t.Errorf("%s: got figures of syringe %d, want those of the order", s.Title, n)
			}
		}
		for _, line := range s.Text() {
			if strings.ContainsAny(line, "{}") {
				t.Errorf("%s: got %q, want every figure filled in", s.Title, line)
			}
		}
	}
}

// A plan whose facts are missing prints empty figures, which the second route
// never passes.
func TestMissingFactsAreNotPassed(t *testing.T) {
	r := papers(t, demo, leftOut)
	bare := sheets.PumpCards(r.list, nil, r.making)
	p := r.list.Plans[3]
	if p.Infusion == nil {
		t.Fatalf("got syringe %d without a pump, want the infusion", p.Number)
	}
	if _, err := recheck.Check(labels.Stated(p, bare[0].FiguresOf(p.Number))); err == nil {
		t.Error("got a pump card without facts passed, want it stopped")
	}
}

// Published rate grid "Critical Care Drug Infusion" (hospital rate grids,
// n.d.), adrenaline 2 mg in 50 mL at 70 kg: 0.1 microgram/kg/min is 10.5 mL/h,
// 0.35 microgram/kg/min is 36.8 mL/h.
func TestPumpCardGivesThePublishedRates(t *testing.T) {
	card := papers(t, demo, leftOut).pump[0]
	figures := map[string]string{}
	for _, f := range card.FiguresOf(card.Syringe) {
		figures[f.Name] = f.Text
	}
	for name, want := range map[string]string{
		recheck.Concentration: "40 micrograms/mL", recheck.StartDose: "0.1 microgram/kg/min", recheck.StartRate: "10.5 mL/h", recheck.RateWeight: "70 kg",
	} {
		if figures[name] != want {
			t.Errorf("%s: got %q, want %q", name, figures[name], want)
		}
	}
	found := false
	for i := 1; i <= 12; i++ {
		if figures[recheck.Row(recheck.Ladder, i, "dose")] == "0.35 microgram/kg/min" {
			found = true
			if got := figures[recheck.Row(recheck.Ladder, i, "rate")]; got != "36.8 mL/h" {
				t.Errorf("ladder: got %q at 0.35 microgram/kg/min, want 36.8 mL/h", got)
			}
		}
	}
	if !found {
		t.Error("got no rung at 0.35 microgram/kg/min, want one")
	}
}

// The card asks in the order in which a pump is set (drug, concentration,
// syringe, weight, dose rate), and the rate that results comes last.
func TestPumpCardOrder(t *testing.T) {
	text := strings.Join(papers(t, demo, leftOut).pump[0].Text(), "\n")
	inOrder(t, text, "Adrenaline", "1  concentration", "40 micrograms/mL", "2  syringe", "50 mL", "3  weight", "70 kg", "4  dose rate",
		"0.1 microgram/kg/min", "then it shows", "10.5 mL/h", "lowest", "highest", "STOP if it shows", "Empty", "Use by", "Next syringe", "same?", "initials")
}

// A rung whose rounded rate would pass the upper end is not printed: nobody
// may titrate above the range by the ladder (R11).
func TestLadderStaysInTheRange(t *testing.T) {
	r := papers(t, strings.Replace(demo, `to = "0.45 microgram/kg/min"`, `to = "0.35 microgram/kg/min"`, 1), leftOut)
	for _, f := range r.pump[0].FiguresOf(r.pump[0].Syringe) {
		// 0.35 x 70 x 60 / 40 = 36.75: half up 36.8, downwards 36.7.
		if f.Text == "36.8 mL/h" {
			t.Errorf("%s: got 36.8 mL/h, want nothing above the upper end of 36.7 mL/h", f.Name)
		}
		if f.Name == recheck.HighRate && f.Text != "36.7 mL/h" {
			t.Errorf("upper end: got %q, want 36.7 mL/h", f.Text)
		}
	}
}

func inOrder(t *testing.T, text string, parts ...string) {
	t.Helper()
	for _, p := range parts {
		_, rest, found := strings.Cut(text, p)
		if !found {
			t.Errorf("got no %q after the parts before it, want it there; left:\n%s", p, text)
			return
		}
		text = rest
	}
}

// NPSA 2007 and the European Board of Anaesthesiology: label after filling,
// match with the ampoule; ANZCA PS51: keep the ampoule for the check.
func TestStepsLabelAfterFilling(t *testing.T) {
	text := strings.Join(papers(t, demo, leftOut).drawUp[0].Text(), "\n")
	inOrder(t, text, sheets.Labelling, "Ephedrine", "Draw up 1 mL from 1 ampoule of ephedrine, 30 mg in 1 mL (30 mg/mL), 1 mL syringe.", "Put it into the 10 mL syringe.",
		"Add sodium chloride 0.9 % up to 10 mL; that is 9 mL.", "Mix", "Look: clear", "Label it now", "Keep the empty ampoule",
		"Propofol", "Turn the ampoule over", "Look: even and white", "Label it now",
		"Remifentanil", "Add 2 mL of sodium chloride 0.9 % to the vial of remifentanil, 2 mg.", "Let all of the powder dissolve", "Draw up 2 mL",
		"Oxytocin", "Take a bag of 500 mL of sodium chloride 0.9 %.", "Withdraw 1 mL from the bag and discard it; 499 mL stay.", "Add it to the bag")
}

// Controlled drugs are wasted before a witness (record practice of controlled
// drugs); what was left out stands on the sheet with its reasons (5).
func TestFootOfTheDrawUpSheet(t *testing.T) {
	r := papers(t, demo, leftOut)
	text := strings.Join(r.drawUp[0].Text(), "\n")
	inOrder(t, text, "Not on this sheet: syringe 4 (ephedrine)", "Fetch", "Left over in the containers, to be discarded", "Witness", "Left out on request", "Syringe 4, ephedrine", "Sources")
	witnessed := map[string]bool{}
	for _, p := range r.drawUp[0].Parts {
		for _, b := range p.Blocks {
			table, ok := b.(sheets.Table)
			if !ok || len(table.Columns) != 6 || table.Columns[5].Head != "Witness" {
				continue
			}
			for _, row := range table.Rows {
				witnessed[row.Cells[1].Text()] = strings.Contains(row.Cells[5].Text(), "_")
			}
		}
	}
	for drug, want := range map[string]bool{"morphine": true, "alfentanil": true, "propofol": false} {
		if got, ok := witnessed[drug]; !ok || got != want {
			t.Errorf("%s: got witness line %v (there: %v), want %v", drug, got, ok, want)
		}
	}
}

// Names repeat between syringes; each figure belongs to its own.
func TestFiguresOfOneSyringe(t *testing.T) {
	r := papers(t, demo, leftOut)
	for n, want := range map[int]string{1: "10 mL", 8: "20 mL"} {
		for _, f := range r.figures(n) {
			if f.Name == recheck.FinalVolume && f.Text != want {
				t.Errorf("syringe %d on the %s: got final volume %q, want %q as ordered", n, f.Paper, f.Text, want)
			}
		}
	}
	if got := len(r.figures(leftOut)); got != 0 {
		t.Errorf("left out: got %d figures, want none", got)
	}
}

func TestEveryCautionIsPrinted(t *testing.T) {
	r := papers(t, demo, leftOut)
	text := strings.Join(r.drawUp[0].Text(), "\n")
	count := 0
	for _, p := range r.list.Plans {
		for _, c := range p.Cautions {
			count++
			if !strings.Contains(text, c.Message[1:]) || !strings.Contains(text, string(c.Code)) {
				t.Errorf("syringe %d: got no caution %s, want %q on the draw-up sheet", p.Number, c.Code, c.Message)
			}
		}
	}
	if count == 0 {
		t.Error("got an order without cautions, want one to test with")
	}
}

func TestNoSyringesNoSheets(t *testing.T) {
	var list dilution.List
	if got := len(sheets.PumpCards(list, nil, labels.Making{})) + len(sheets.CheckSheets(list, nil, labels.Making{})); got != 0 {
		t.Errorf("got %d sheets of an empty list, want none", got)
	}
}

func TestFootCarriesTheMaking(t *testing.T) {
	r := papers(t, demo, leftOut)
	for _, s := range r.all() {
		m := r.making
		want := sheets.Foot{Made: m.Made, Preparer: m.Preparer, Place: m.Place, Formulary: m.Formulary, FormularyDigest: m.FormularyDigest, State: m.State, Digest: m.Digest, Invented: true}
		if s.Paper != sheets.PaperDrawUp { // it says so itself, with the reasons
			want.LeftOut = "Left out: syringe 4, see draw-up sheet."
		}
		if s.Foot != want {
			t.Errorf("%s: got foot %+v, want %+v", s.Title, s.Foot, want)
		}
	}
	for _, s := range papers(t, demo, 0).all() {
		if s.Foot.LeftOut != "" {
			t.Errorf("%s: got %q with nothing left out, want no such line", s.Title, s.Foot.LeftOut)
		}
	}
	if got := fmt.Sprint(len(r.drawUp), len(r.pump), len(r.check)); got != "1 3 16" {
		t.Errorf("got %s sheets, want 1 draw-up sheet, 3 cards, 2 check sheets for each of 8 syringes", got)
	}
}

// A pump card holds what is needed at the pump. Notes and sources of the
// formulary stand on the draw-up sheet, and the card says so.
func TestPumpCardLeavesNotesToTheDrawUpSheet(t *testing.T) {
	r := papers(t, demo, leftOut)
	drawUp := strings.Join(r.drawUp[0].Text(), "\n")
	for _, card := range r.pump {
		if !card.OnePage || card.Size != sheets.A5 {
			t.Errorf("%s: got one page %v, size %s, want one page of A5", card.Of, card.OnePage, card.Size)
		}
		text := strings.Join(card.Text(), "\n")
		if !strings.Contains(text, "Notes and sources: draw-up sheet.") || regexp.MustCompile(`source [0-9]|source:`).MatchString(text) {
			t.Errorf("%s: got sources on the card or no word where they stand:\n%s", card.Of, text)
		}
		p := planOf(r, card.Syringe)
		if len(p.Drug.Cautions) == 0 {
			t.Errorf("%s: got a drug without notes, want one to test with", card.Of)
		}
		for _, n := range p.Drug.Cautions {
			note := strings.TrimSuffix(n.Text, ".")
			if strings.Contains(text, note) {
				t.Errorf("%s: got the note %q on the card, want it on the draw-up sheet", card.Of, note)
			}
			if !strings.Contains(drawUp, note) {
				t.Errorf("%s: got no note %q on the draw-up sheet, want it", card.Of, note)
			}
		}
		for _, c := range p.Cautions {
			if !strings.Contains(text, c.Message[1:]) {
				t.Errorf("%s: got no caution %q on the card, want all of the plan's own", card.Of, c.Message)
			}
		}
	}
}

func planOf(r run, number int) dilution.Plan {
	for _, p := range r.list.Plans {
		if p.Number == number {
			return p
		}
	}
	return dilution.Plan{}
}

// Whichever limit of the use-by time ends first is named in words that read:
// propofol's stability is stored for any fluid, and no fluid is named then.
func TestUseByReasonReads(t *testing.T) {
	r := papers(t, demo, leftOut)
	text := strings.Join(append(r.drawUp[0].Text(), r.check[5].Text()...), "\n")
	if !strings.Contains(text, ": stability at room temperature ends first") || strings.Contains(text, "stability,") || strings.Contains(text, "in any") {
		t.Errorf("got no plain reason of the use-by time, want \"stability at room temperature\" in:\n%s", text)
	}
}

// The second person reads the container's name once.
func TestContainerIsNamedOnce(t *testing.T) {
	for _, line := range papers(t, demo, leftOut).check[0].Text() {
		if strings.Count(line, "ampoule") > 1 {
			t.Errorf("got %q, want the container named once", line)
		}
	}
}

// Every row of the containers to fetch says for whom it is.
func TestFetchNamesThePatient(t *testing.T) {
	r := papers(t, demo, leftOut)
	rows := 0
	for _, p := range r.drawUp[0].Parts {
		for _, b := range p.Blocks {
			table, ok := b.(sheets.Table)
			if !ok || len(table.Columns) < 2 || table.Columns[1].Head != "For" {
				continue
			}
			for _, row := range table.Rows {
				rows++
				if got, want := row.Cells[1].Text(), planOf(r, row.Syringe).Patient.ID.Value; got != want {
					t.Errorf("syringe %d: got patient %q, want %q", row.Syringe, got, want)
				}
			}
		}
	}
	if rows != len(r.list.Plans) {
		t.Errorf("got %d rows to fetch, want %d", rows, len(r.list.Plans))
	}
}

// A syringe that is left out is not planned, so none of its figures can be
// worked again: its reasons stand in the words of their codes.
func TestLeftOutReasonsHoldNoFigure(t *testing.T) {
	r := papers(t, strings.Replace(demo, "  dose = \"2 mg/kg lean\"", "  dose = \"90 mg/kg lean\"", 1), 3)
	_, after, _ := strings.Cut(strings.Join(r.drawUp[0].Text(), "\n"), "Left out on request")
	part, _, _ := strings.Cut(after, "Notes of the formulary")
	if !strings.Contains(part, "Syringe 3, propofol") || !strings.Contains(part, "slip-ten-times") && !strings.Contains(part, "dose-above") && !strings.Contains(part, "formulary-blank") {
		t.Errorf("got no reason for the syringe that was left out in:\n%s", part)
	}
	if strings.Contains(part, "90 mg") {
		t.Errorf("got a figure that no second route has seen in:\n%s", part)
	}
}
