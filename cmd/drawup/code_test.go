package main

import (
	"image"
	"path/filepath"
	"regexp"
	"slices"
	"strings"
	"testing"
	"time"

	"drawup/layouts"
	"drawup/layouts/ink"
	"drawup/layouts/pdf/readback"
)

// atcOf is the WHO ATC index, snapshot of 25 April 2026, for the names that the
// demonstration labels print.
func atcOf(name string) string {
	return map[string]string{
		"Etomidate": "N01AX07", "Fentanyl": "N01AH01", "Rocuronium": "M03AC09", "Metaraminol": "C01CA09", "Sugammadex": "V03AB35",
		"Noradrenaline": "C01CA03", "Propofol": "N01AX10", "Alfentanil": "N01AH02", "Suxamethonium": "M03AB01", "Midazolam": "N05CD08",
		"Ondansetron": "A04AA01", "Neostigmine": "N07AA51", "Heparin": "B01AB01", "Labetalol": "C07AG01", "Ketamine": "N01AX03",
		"Atropine": "A03BA01", "Bupivacaine": "N01BB01", "Naloxone": "V03AB15", "Adrenaline": "C01CA24", "Ephedrine": "C01CA26",
		"Magnesium sulfate": "B05XA05", "Remifentanil": "N01AH06",
	}[name]
}

// A seenLabel is one label of the rendered page: what its code says, as another
// reader decodes it, and every word printed on it, as the renderer extracts
// them.
type seenLabel struct {
	fields map[string]string // by identifier
	runs   []readback.Run
	words  string
}

// seenLabels renders the demonstration's labels and takes them apart.
func seenLabels(t *testing.T) []seenLabel {
	t.Helper()
	j := demoJob(t)
	flags, _ := readPaperFlags("prepare", nil)
	parts, reasons := flags.labelParts(j)
	if reasons.Refused() || len(parts) != 1 {
		t.Fatal(len(parts), reasons.Refusals())
	}
	f := readback.Open(t, load(t, filepath.Join(prepared(t), "labels.pdf")))
	var out []seenLabel
	number := 0
	for _, run := range parts[0].runs {
		pages, reasons := placeLabels(j, run.list, run.stock, run.used, false)
		if reasons.Refused() {
			t.Fatal(reasons.Refusals())
		}
		s, _ := layouts.StockNamed(run.stock)
		for _, page := range pages {
			number++
			img, runs := f.Render(number, 600), f.Text(number)
			for _, symbol := range symbolsOf(page) {
				out = append(out, seenAt(t, s, symbol, img, runs))
			}
		}
	}
	if len(out) != len(j.labels) {
		t.Fatalf("found %d labels, want %d", len(out), len(j.labels))
	}
	return out
}

// seenAt is the label that the symbol stands on.
func seenAt(t *testing.T, s layouts.Stock, symbol ink.Symbol, img *image.RGBA, runs []readback.Run) seenLabel {
	t.Helper()
	text, err := readSymbol(img, symbol, 600)
	if err != nil {
		t.Fatal(err)
	}
	out := seenLabel{fields: takenApart(t, text)}
	for n := range s.Columns * s.Rows {
		p := s.Place(n)
		if symbol.X < p.X || symbol.X > p.X+s.LabelW || symbol.Y < p.Y || symbol.Y > p.Y+s.LabelH {
			continue
		}
		for _, r := range runs {
			if r.StartX > p.X && r.StartX < p.X+s.LabelW && r.StartY > p.Y && r.StartY < p.Y+s.LabelH {
				out.runs, out.words = append(out.runs, r), out.words+" "+strings.TrimSpace(r.Text)
			}
		}
	}
	return out
}

// takenApart cuts what a scanner sends, by the rules for the identifiers that
// labels carry: two digits, but 7003; 01 has fourteen digits and no separator
// behind it.
func takenApart(t *testing.T, text string) map[string]string {
	t.Helper()
	rest, ok := strings.CutPrefix(text, "]d2")
	if !ok {
		t.Fatalf("%q is no GS1 DataMatrix", text)
	}
	out := map[string]string{}
	for rest != "" {
		if number, ok := strings.CutPrefix(rest, "01"); ok {
			out["01"], rest = number[:14], number[14:]
			continue
		}
		element, after, _ := strings.Cut(rest, "\x1d")
		n := 2
		if strings.HasPrefix(element, "7003") {
			n = 4
		}
		out[element[:n]], rest = element[n:], after
	}
	return out
}

// asPrinted is "2mg/mL" or "5000unit" in the words of the uk style: a blank,
// units in full and with an s behind any number but one, groups of three digits.
func asPrinted(coded string) string {
	at := strings.IndexFunc(coded, func(r rune) bool { return r != '.' && (r < '0' || r > '9') })
	number, unit := coded[:at], coded[at:]
	unit, per, _ := strings.Cut(unit, "/")
	word := map[string]string{"ug": "microgram", "ng": "nanogram", "unit": "unit", "umol": "micromol"}[unit]
	switch {
	case word == "":
		word = unit
	case number != "1" && !strings.HasPrefix(number, "0.") && word != "micromol":
		word += "s"
	}
	if whole, _, _ := strings.Cut(number, "."); len(whole) > 3 {
		number = whole[:len(whole)-3] + "," + number[len(whole)-3:]
	}
	if per != "" {
		word += "/" + per
	}
	return number + " " + word
}

// Field by field, what the code says is what the label says in print, read from
// the rendered page by other people's reader and renderer: drug, concentration,
// amount, use-by, serial, reference; the formulary's digest stands on the
// sheets, and the site's number in the order.
func TestCodeSaysWhatIsPrinted(t *testing.T) {
	dir := prepared(t)
	sheet := squeeze(readback.Open(t, load(t, filepath.Join(dir, "draw-up.pdf"))).AllText(1))
	order := string(load(t, demo))
	met := map[string]int{}
	for _, s := range seenLabels(t) {
		has := func(what, text string) {
			t.Helper()
			if !regexp.MustCompile(`(^|[^0-9A-Za-z.,])` + regexp.QuoteMeta(text) + `($|[^0-9A-Za-z.,/])`).MatchString(s.words) {
				t.Errorf("the code's %s is %q; the label says%s", what, text, s.words)
			}
		}
		if atc := s.fields["91"]; atc != "" && !slices.ContainsFunc(s.runs, func(r readback.Run) bool { return atcOf(strings.TrimSpace(r.Text)) == atc }) {
			t.Errorf("the code's drug is %s; the label says%s", atc, s.words)
		}
		until, serial := s.fields["7003"], s.fields["21"]
		if both := s.fields["92"]; both != "" {
			until, serial = both[:10], both[10:]
		}
		at, err := time.Parse("0601021504", until)
		if err != nil || len(serial) != 8 {
			t.Errorf("got use-by %q, serial %q: %v", until, serial, err)
		}
		has("use-by", "use by "+at.Format("02 Jan 2006 15:04"))
		has("serial", serial)
		for ai, what := range map[string]string{"93": "concentration", "94": "amount", "96": "second concentration"} {
			if s.fields[ai] != "" {
				has(what, asPrinted(s.fields[ai]))
			}
		}
		if run := s.fields["10"]; run != "" {
			has("reference", "ref "+run)
		}
		if digest := s.fields["95"]; digest != "" && (len(digest) != 8 || !strings.Contains(sheet, digest)) {
			t.Errorf("the code's formulary is %q, which no sheet says", digest)
		}
		if number := s.fields["01"]; number != "" && !strings.Contains(order, strings.TrimLeft(number, "0")) {
			t.Errorf("the code's GTIN is %q, which the order does not say", number)
		}
		for ai := range s.fields {
			met[ai]++
		}
	}
	for _, ai := range []string{"01", "7003", "10", "21", "91", "92", "93", "94", "95", "96"} {
		if met[ai] == 0 {
			t.Errorf("no label of the demonstration carries (%s)", ai)
		}
	}
	t.Logf("identifiers met: %v", met)
}
