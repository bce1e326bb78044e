package main

import (
	"bytes"
	"encoding/json"
	"fmt"
	"math/rand/v2"
	"os"
	"path/filepath"
	"regexp"
	"slices"
	"strings"
	"testing"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/quantity/lint"
	"drawup/dilution/refusal"
	"drawup/labels"
	"drawup/labels/sheets"
)

// This file holds everything that the tool prints against the rules N01 to N28
// of numbers, units and names (rule R14), in each house style.

// A reader reads texts in one house style and tells what must not be printed.
type proofreader struct {
	t      *testing.T
	house  lint.House
	titles *strings.Replacer // titles of documents, names of fluids, formulas: quoted as they are
	seen   map[string]bool
	told   int
}

// quotes are what somebody typed, or an identifier to type, in a sentence.
var quotes = regexp.MustCompile(`"(?:[^"\\]|\\.)*"`)

func newProofreader(t *testing.T, f *formulary.Formulary, style string) *proofreader {
	h, ok := lint.Named(style)
	if !ok {
		t.Fatalf("no house style %q", style)
	}
	var names []string
	known := map[string]bool{}
	note := func(name string) {
		if name != "" && !known[name] {
			known[name] = true
			names = append(names, name)
		}
	}
	for _, d := range f.Drugs() {
		for _, e := range d.Entries() {
			note(e.Source.Title)
		}
		note(d.Formula)
		if d.Salt != nil {
			note(d.Salt.Formula)
		}
		for _, p := range d.Presentations {
			for _, x := range append(slices.Clone(p.Diluents), p.Forbidden...) {
				note(x.Name)
			}
		}
	}
	if len(names) < 200 {
		t.Fatalf("got %d titles and names, want those of the whole formulary", len(names))
	}
	slices.SortFunc(names, func(a, b string) int { return len(b) - len(a) }) // the longer of two goes first
	var pairs []string
	for _, name := range names {
		pairs = append(pairs, name, "")
	}
	return &proofreader{t: t, house: h, titles: strings.NewReplacer(pairs...), seen: map[string]bool{}}
}

// read holds a text against the rules. Titles of documents and what stands in
// quotation marks are not the tool's own words.
func (r *proofreader) read(where, text string) {
	if r.seen[text] {
		return
	}
	r.seen[text] = true
	own := quotes.ReplaceAllString(r.titles.Replace(text), `""`)
	for _, f := range r.house.Printed(own) {
		if r.told++; r.told < 20 {
			r.t.Errorf("%s, %s: %s in %q: %s", r.house, where, f.Rule.Code, text, f.Rule.Fault)
		}
	}
}

func (r *proofreader) reasons(where string, l refusal.List) {
	for _, x := range l {
		r.read(where, x.Message)
		r.read(where, x.Remedy)
		r.read(where, x.Source)
	}
}

// label reads a label line by line and as a whole.
func (r *proofreader) label(l labels.Label) {
	l.Codes = nil // for scanners
	lines := l.Text()
	for _, line := range lines {
		r.read("label", line)
	}
	drug := l.Name
	if l.Second != "" {
		drug = "" // the rules on a whole label are about one drug
	}
	for _, f := range r.house.Whole(drug, lines) {
		r.t.Errorf("%s, label of %s: %s: %s", r.house, l.Name, f.Rule.Code, f.Rule.Fault)
	}
}

// sheet reads every line of a sheet, and a pump card as a whole.
func (r *proofreader) sheet(s sheets.Sheet) {
	lines := s.Text()
	for _, line := range lines {
		r.read(s.Paper, line)
	}
	if s.Paper != sheets.PaperPump {
		return
	}
	// What the formulary says in sentences keeps its own units.
	lines = slices.DeleteFunc(lines, func(line string) bool { return strings.HasSuffix(line, ".") })
	for _, f := range r.house.Whole(s.Of, lines) {
		r.t.Errorf("%s, pump card of %s: %s: %s: %q", r.house, s.Of, f.Rule.Code, f.Rule.Fault, f.Got)
	}
}

// job reads all papers of an order, its table and its document.
func (r *proofreader) job(j *job, reasons refusal.List) {
	for _, l := range j.labels {
		r.label(l)
	}
	for _, s := range j.allSheets() {
		r.sheet(s)
	}
	for _, text := range j.foot() {
		r.read("margin", text)
	}
	for i, p := range j.list.Plans {
		for _, cell := range cellsOf(p, j.facts[i]) {
			r.read("table", cell)
		}
		r.reasons("caution", p.Cautions)
	}
	r.reasons("caution", reasons)
	doc, err := encode(planOf(j))
	if err != nil {
		r.t.Fatal(err)
	}
	r.document(doc)
}

// document reads what a JSON document says is printed, and its sentences.
func (r *proofreader) document(data []byte) {
	var v any
	if err := json.Unmarshal(data, &v); err != nil {
		r.t.Fatal(err)
	}
	r.value("", v)
}

func (r *proofreader) value(key string, v any) {
	switch v := v.(type) {
	case map[string]any:
		if v["unit"] == "%" {
			return // the width of an interval or what a rounding lost: no strength
		}
		for k, x := range v {
			r.value(k, x)
		}
	case []any:
		for _, x := range v {
			r.value(key, x)
		}
	case string:
		if slices.Contains([]string{"printed", "message", "remedy", "source", "diluent", "checked_against", "kind", "won"}, key) {
			r.read("document, "+key, v)
		}
	}
}

// styled is an order file in another house style, as a file of its own.
func styled(t *testing.T, file, style string) string {
	t.Helper()
	text := strings.Replace(string(load(t, file)), "style = \"uk\"", "", 1)
	path := filepath.Join(t.TempDir(), filepath.Base(file))
	if err := os.WriteFile(path, []byte(strings.Replace(text, "[site]", "[site]\nstyle = \""+style+"\"", 1)), 0o644); err != nil {
		t.Fatal(err)
	}
	return path
}

// worked is the job of an order without the syringes that are refused.
func worked(t *testing.T, f *formulary.Formulary, path string) (*job, refusal.List) {
	t.Helper()
	flags, _ := readPaperFlags("prepare", nil)
	without := map[int]bool{}
	for range 20 { // a refusal may show only when another is gone
		j, reasons := newJob(path, library{form: f}, flags.when(nil), without, silent)
		if !reasons.Refused() {
			return j, reasons
		}
		for _, x := range reasons.Refusals() {
			if x.Syringe == 0 || x.Code == refusal.RoutesDisagree {
				t.Fatalf("%s", x.Error())
			}
			without[x.Syringe] = true
		}
	}
	t.Fatal("the order is refused for other syringes each time")
	return nil, nil
}

// Nothing that the tool prints of the demonstration orders breaks a rule: no
// label, sheet, table, caution or "printed" of the document, in no house style.
func TestNothingPrintedIsMisread(t *testing.T) {
	f, err := formulary.Default()
	if err != nil {
		t.Fatal(err)
	}
	for _, style := range []string{"uk", "us", "si"} {
		r := newProofreader(t, f, style)
		for _, file := range []string{demo, "../../testdata/orders/harbour-bags.toml"} {
			j, reasons := worked(t, f, styled(t, file, style))
			r.job(j, reasons)
		}
		if len(r.seen) < 500 {
			t.Errorf("%s: got %d texts, want all of two orders", style, len(r.seen))
		}
	}
}

// The reader above can fail: a figure in a wrong form is found on each paper.
func TestMisreadFiguresAreFound(t *testing.T) {
	h := lint.UK()
	for text, code := range map[string]string{"use by 01 Dec 2026": "N25", "draw 5.0 mL": "N01", "1200 mg": "N09", "50 mcg/mL": "N06"} {
		if found := h.Printed(text); len(found) != 1 || found[0].Rule.Code != code {
			t.Errorf("%q: got %v, want %s", text, found, code)
		}
	}
	if found := h.Whole("Noradrenaline", []string{"80 micrograms/mL", "4 mg in 50 mL"}); len(found) != 1 || found[0].Rule.Code != "N23" {
		t.Errorf("got %v, want N23", found)
	}
}

// assay is the cell of a table with an assay limit, which is no strength.
var assay = regexp.MustCompile(`^[0-9.]+ %$`)

// What the stored formulary says, on the terminal and on its own paper.
func TestFormularyIsNotMisread(t *testing.T) {
	f, err := formulary.Default()
	if err != nil {
		t.Fatal(err)
	}
	r := newProofreader(t, f, "uk")
	book := sheets.FormularyBook(f, "01 Dec 2026")
	for _, s := range append(book.Drugs, book.Front(map[string]int{})) {
		for _, line := range s.Text() {
			if _, class := labels.ClassOf(line); !class && !assay.MatchString(line) {
				r.read("formulary print", line)
			}
		}
	}
	broken := regexp.MustCompile(`\n {20,}`)
	for _, d := range f.Drugs() {
		var out bytes.Buffer
		showDrug(&out, &drugDocument{Formulary: headOf(f), Drug: drugOf(quantity.UK(), d), Pairs: pairsOf(f, d.Name)})
		text := strings.ReplaceAll(out.String(), "\n"+strings.Repeat(" ", nameWidth+2)+"source", "\n:source")
		for _, line := range strings.Split(broken.ReplaceAllString(text, " "), "\n") {
			if !strings.HasPrefix(line, "  label class ") { // a code of the data
				r.read("formulary show "+d.Name, line)
			}
		}
	}
}

// The quick sums, with the examples of their own help and of the manual, in
// each house style.
func TestQuickSumsAreNotMisread(t *testing.T) {
	f, err := formulary.Default()
	if err != nil {
		t.Fatal(err)
	}
	asked := regexp.MustCompile(`drawup ((?:mix|rate|dose|body|convert|total|flow|local|accuracy) [^|<>\n]*)`)
	var lines []string
	for _, c := range commands() {
		if text, ok := helpText(c.name); ok {
			for _, m := range asked.FindAllStringSubmatch(text, -1) {
				lines = append(lines, m[1])
			}
		}
	}
	for _, m := range asked.FindAllStringSubmatch(string(load(t, "../../README.md")), -1) {
		lines = append(lines, m[1])
	}
	for _, style := range []string{"uk", "us", "si"} {
		r, made := newProofreader(t, f, style), 0
		for _, line := range lines {
			args := append(quotedWords(line), "--style", style)
			var out, doc, errs bytes.Buffer
			if run(args, strings.NewReader(""), &out, &errs) != exitMade {
				continue
			}
			made++
			for _, text := range strings.Split(out.String(), "\n") {
				if !strings.HasPrefix(text, "  exactly ") { // in full on purpose
					r.read(line, text)
				}
			}
			run(append(args, "--json"), strings.NewReader(""), &doc, &errs)
			r.document(doc.Bytes())
		}
		if made < 9 {
			t.Errorf("%s: got %d sums worked, want those of the manual", style, made)
		}
	}
}

// quotedWords splits a line as a shell would, double quotes only.
func quotedWords(line string) []string {
	var out []string
	for i, part := range strings.Split(line, `"`) {
		if i%2 == 1 {
			out = append(out, part)
			continue
		}
		if part, _, comment := strings.Cut(part, "#"); comment {
			return append(out, strings.Fields(part)...)
		}
		out = append(out, strings.Fields(part)...)
	}
	return out
}

// Help is in the house's words too. The pages on typing show what is read and
// never printed, and are left out.
func TestHelpIsNotMisread(t *testing.T) {
	f, err := formulary.Default()
	if err != nil {
		t.Fatal(err)
	}
	r := newProofreader(t, f, "uk")
	for _, name := range helpNames() {
		if name == "quantities" || name == "wording" {
			continue
		}
		text, _ := helpText(name)
		for _, line := range strings.Split(text, "\n") {
			if strings.HasPrefix(line, "  --") || strings.HasPrefix(line, "  drawup ") {
				continue // what to type
			}
			r.read("help "+name, line)
		}
	}
}

// randomOrder is an order of n syringes over the whole starter, many of them
// refused.
func randomOrder(f *formulary.Formulary, rnd *rand.Rand, style string, n int) string {
	var b strings.Builder
	fmt.Fprintf(&b, "[session]\nplace = \"theatre 2\"\ndate = \"2026-12-01\"\nprepared = \"07:30\"\npreparer = \"A. Example\"\ninvented = true\n[site]\nstyle = %q\n", style)
	b.WriteString("[[patient]]\nid = \"A\"\nsex = \"female\"\nage = \"40 years\"\nheight = \"168 cm\"\nweight = \"70 kg\"\n")
	drugs := slices.DeleteFunc(f.Drugs(), func(d formulary.Drug) bool { return len(d.Presentations) == 0 })
	for range n {
		b.WriteString(randomSyringe(drugs[rnd.IntN(len(drugs))], rnd))
	}
	return b.String()
}

func randomSyringe(d formulary.Drug, rnd *rand.Rand) string {
	p := d.Presentations[rnd.IntN(len(d.Presentations))]
	body := fmt.Sprintf("drug = %q\npresentation = %q\n", d.Name, p.ID)
	if len(p.Diluents) > 0 && rnd.IntN(2) == 0 {
		body += fmt.Sprintf("diluent = %q\n", p.Diluents[rnd.IntN(len(p.Diluents))].Name)
	}
	numbers := []string{"1", "2", "4", "5", "7.5", "8", "10", "12.5", "20", "25", "40", "50", "60", "100", "150", "200", "250", "400", "500", "1000", "2000", "5000", "25000"}
	amount := numbers[rnd.IntN(len(numbers))] + " " + p.Amount.Unit().String()
	volume := []string{"2 mL", "5 mL", "10 mL", "20 mL", "40 mL", "50 mL"}[rnd.IntN(6)]
	switch k := rnd.IntN(3); {
	case k == 0 && len(d.Standards) > 0 && len(d.Rates) > 0:
		s, row := d.Standards[rnd.IntN(len(d.Standards))], d.Rates[rnd.IntN(len(d.Rates))]
		return "[[patient.infusion]]\n" + body + fmt.Sprintf("standard = %q\nline = \"central\"\nstart = %q\nindication = %q\n", s.ID, row.UsualHigh.Text, row.For)
	case k == 0 && len(d.Rates) > 0:
		row := d.Rates[rnd.IntN(len(d.Rates))]
		return "[[patient.infusion]]\n" + body + fmt.Sprintf("mix = %q\nline = \"central\"\nstart = %q\nindication = %q\n", amount+" in "+volume, row.UsualHigh.Text, row.For)
	case k < 2 && len(d.Doses) > 0:
		row := d.Doses[rnd.IntN(len(d.Doses))]
		return "[[patient.syringe]]\n" + body + fmt.Sprintf("dose = %q\nindication = %q\nroute = %q\n", row.UsualHigh.Text, row.For, row.Routes[0])
	}
	if rnd.IntN(2) == 0 {
		return "[[patient.syringe]]\n" + body + fmt.Sprintf("amount = %q\nvolume = %q\n", amount, volume)
	}
	return "[[patient.syringe]]\n" + body + fmt.Sprintf("amount = %q\n", amount)
}

// Plans made at random over the whole starter, in all three house styles:
// nothing on their labels, sheets and documents breaks a rule. Ten thousand of
// them are read behind the build tag secondopinion.
func TestRandomPlansAreNotMisread(t *testing.T) { readRandomPlans(t, 150) }

func readRandomPlans(t *testing.T, want int) {
	t.Helper()
	f, err := formulary.Default()
	if err != nil {
		t.Fatal(err)
	}
	rnd := rand.New(rand.NewPCG(26825, 2020))
	made, path := 0, filepath.Join(t.TempDir(), "random.toml")
	var readers []*proofreader
	for _, style := range []string{"uk", "us", "si"} {
		readers = append(readers, newProofreader(t, f, style))
	}
	for turn := 0; made < want; turn++ {
		r := readers[turn%len(readers)]
		if err := os.WriteFile(path, []byte(randomOrder(f, rnd, r.house.String(), 40)), 0o644); err != nil {
			t.Fatal(err)
		}
		j, reasons := worked(t, f, path)
		r.job(j, reasons)
		made += len(j.list.Plans)
		if turn > want {
			t.Fatalf("got %d plans of %d orders, want more of them made", made, turn)
		}
	}
}
