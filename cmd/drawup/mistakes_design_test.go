package main

import (
	"bytes"
	"fmt"
	"math"
	"path/filepath"
	"regexp"
	"strings"
	"testing"

	"drawup/dilution/quantity/lint"
	"drawup/labels"
	"drawup/layouts/ink"
	"drawup/layouts/pdf/readback"
)

// Proofs about the design of a label. Lengths are micrometres.

func fillOf(code string) ink.Colour {
	c, _ := labels.ClassOf(code)
	return ink.Colour{R: c.Fill.R, G: c.Fill.G, B: c.Fill.B}
}

// near says whether a pixel has a colour, but for the renderer's rounding.
func near(a, b ink.Colour) bool {
	d := func(x, y uint8) bool { return int(x)-int(y) <= 4 && int(y)-int(x) <= 4 }
	return d(a.R, b.R) && d(a.G, b.G) && d(a.B, b.B)
}

func isDark(c ink.Colour) bool { return c.R < 110 && c.G < 110 && c.B < 110 }

// striped are the labels of opposite action and the class of their stripes.
func (g *gallery) striped() map[string]string {
	return map[string]string{"Flumazenil": "BZD-A", "Neostigmine": "NMB-R", "Sugammadex": "NMB-R", "Naloxone": "OPI-A", "Labetalol": "HYP", "Glyceryl trinitrate": "HYP"}
}

// starts are the places along a line where a stripe begins: colour after white.
func starts(p *labelPage, colour ink.Colour, y ink.Micrometre) []ink.Micrometre {
	var out []ink.Micrometre
	was := true
	for x := ink.Micrometre(200); x < p.w-200; x += 10 {
		now := near(p.at(x, y), colour)
		if now && !was && (x < 800 || near(p.at(x-400, y), ink.White)) {
			out = append(out, x)
		}
		was = now
	}
	return out
}

func stripesLeanRight(t *testing.T, g *gallery) {
	for name, class := range g.striped() {
		p, colour := g.of(t, name), fillOf(class)
		y := p.h / 10
		for _, x := range starts(p, colour, y)[:6] {
			mid := x + 707
			if !near(p.at(mid+1000, y-1000), colour) || !near(p.at(mid-1000, y+1000), colour) {
				t.Errorf("%s: no colour 1 mm up to the right and down to the left of the stripe at %d", name, x)
			}
			if near(p.at(mid+1000, y+1000), colour) && near(p.at(mid+500, y+500), colour) {
				t.Errorf("%s: the stripe at %d leans to the left", name, x)
			}
		}
	}
}

func stripeWidthAcross(t *testing.T, g *gallery) {
	for name, class := range g.striped() {
		p := g.of(t, name)
		at := starts(p, fillOf(class), p.h/10)
		if pitch := float64(at[len(at)-1]-at[0]) / float64(len(at)-1) / 1000; math.Abs(pitch-2/math.Sin(math.Pi/4)) > 0.03 {
			t.Errorf("%s: got a pitch of %.3f mm, want 2.828 for stripes of 1 mm across", name, pitch)
		}
	}
}

func noStripesAtName(t *testing.T, g *gallery) {
	for name, class := range g.striped() {
		p := g.of(t, name)
		word := p.run(t, firstWord(name))
		for y := word.StartY - 2500; y < p.h-300; y += 100 {
			if near(p.at(p.w/2, y), fillOf(class)) {
				t.Fatalf("%s: got a stripe behind or below the name at %d", name, y)
			}
		}
	}
}

func firstWord(s string) string {
	w, _, _ := strings.Cut(s, " ")
	return w
}

// On every stock the band is at least 20 % of the width and the sides 15 % of
// the length, whatever the size of the type.
func stripesWideEnough(t *testing.T, _ *gallery) {
	one := fmt.Sprintf(theSession, "") + "[[patient.syringe]]\ndrug = \"naloxone\"\namount = \"400 microgram\"\n"
	tried := 0
	for _, stock := range strings.Split(stockNames(), ", ") {
		dir, told, code := prepareText(t, one, "--stock", stock, "--infusion-stock", stock)
		if code != exitMade {
			if !strings.Contains(told, "label-too-small") {
				t.Errorf("%s: %s", stock, told)
			}
			continue
		}
		tried++
		f := readback.Open(t, load(t, filepath.Join(dir, "labels.pdf")))
		img, colour := f.Render(1, 300), fillOf("OPI-A")
		on := func(x, y ink.Micrometre) bool { return near(readback.At(img, x, y, 300), colour) }
		w, h := f.Size(1)
		left, right, top, side, band := w, ink.Micrometre(0), h, ink.Micrometre(0), ink.Micrometre(0)
		for y := ink.Micrometre(100); y < h-100; y += 85 {
			for x := ink.Micrometre(100); x < w-100; x += 85 {
				if on(x, y) {
					left, right, top = min(left, x), max(right, x), min(top, y)
				}
			}
		}
		length := right - left
		for y := top; y < h-100; y += 85 {
			for x := left; x < right; x += 85 {
				if !on(x, y) {
					continue
				}
				if mid := x - left; mid > length*2/5 && mid < length*3/5 {
					band = max(band, y-top)
				}
				if y > top+band+1500 && x < left+length/2 {
					side = max(side, x-left)
				}
			}
		}
		// The panel's own height shows by the striped U: its legs end with the
		// upper half, 0.35 mm above the middle.
		if side < length*15/100-200 {
			t.Errorf("%s: got sides of %d on a label of %d, want 15 %%", stock, side, length)
		}
		if band < 1900 {
			t.Errorf("%s: got a band of %d, want 2 mm on the smallest label", stock, band)
		}
	}
	if tried < 2 {
		t.Errorf("got %d stocks that hold the label, want 2 and more", tried)
	}
}

func hypotensivesStriped(t *testing.T, g *gallery) {
	for name, want := range map[string]bool{"Labetalol": true, "Glyceryl trinitrate": true, "Metaraminol": false, "Ephedrine": false, "Noradrenaline": false} {
		p := g.of(t, name)
		if got := len(starts(p, fillOf("VAS"), p.h/10)) > 8; got != want {
			t.Errorf("%s: got stripes %v, want %v", name, got, want)
		}
	}
}

func reversalLine(t *testing.T, g *gallery) {
	for name := range g.striped() {
		p := g.of(t, name)
		black := ink.Micrometre(0)
		for y := p.h * 2 / 5; y < p.h*11/20; y += 20 {
			if isDark(p.at(500, y)) && isDark(p.at(p.w-500, y)) {
				black += 20
			}
		}
		if want := name == "Neostigmine" || name == "Sugammadex"; want != (black >= 300) {
			t.Errorf("%s: got %d of a line, want one %v", name, black, want)
		}
	}
	for _, name := range []string{"Neostigmine", "Sugammadex"} { // by ATC code one is a cholinergic, the other an antidote
		if p := g.of(t, name); len(starts(p, fillOf("NMB"), p.h/10)) < 8 || g.class(p) != "NMB-R" {
			t.Errorf("%s: the stripes are not the relaxants' red", name)
		}
	}
}

func barWhereItBelongs(t *testing.T, g *gallery) {
	for name, p := range g.pages {
		bar := true
		for _, part := range []ink.Micrometre{5, 20, 35, 46} {
			bar = bar && isDark(p.at(300, p.h*part/100)) && (part > 40 || isDark(p.at(p.w-300, p.h*part/100)))
		}
		if want := name == "Suxamethonium" || name == "Adrenaline"; bar != want {
			t.Errorf("%s: got bar %v, want %v", name, bar, want)
		}
		if isDark(p.at(450, p.h*54/100)) {
			t.Errorf("%s: the lower half is black too", name)
		}
	}
}

func lettersOnBar(t *testing.T, g *gallery) {
	for _, name := range []string{"Suxamethonium", "Adrenaline"} {
		if c := g.of(t, name).run(t, name).Colour; c != ink.White {
			t.Errorf("%s: got letters %v on black, want white: 21 to 1", name, c)
		}
	}
}

func noWhiteText(t *testing.T, g *gallery) {
	for name, p := range g.pages {
		for _, r := range p.runs {
			inBar := (name == "Suxamethonium" || name == "Adrenaline") && r.StartY < p.h/2
			if r.Colour != ink.Black && !(inBar && r.Colour == ink.White) {
				t.Errorf("%s: got %q in %v", name, r.Text, r.Colour)
			}
		}
	}
}

func heightOfLetters(t *testing.T, g *gallery) {
	for name, p := range g.pages {
		word := p.run(t, firstWord(name))
		white := word.Colour == ink.White
		inked := func(y ink.Micrometre) bool {
			for x := word.StartX; x < word.StartX+word.Size/2; x += 20 {
				if c := p.at(x, y); white != isDark(c) && (white || isDark(c)) && (!white || c.R > 200) {
					return true
				}
			}
			return false
		}
		height := ink.Micrometre(0)
		for y := word.StartY - 60; y > 0 && inked(y); y -= 20 {
			height += 20
		}
		if height += 60; height < 2480 {
			t.Errorf("%s: got a capital %d high on the page, want 2500", name, height)
		}
	}
}

func longNames(t *testing.T, g *gallery) {
	for _, name := range []string{"Dexmedetomidine", "Levobupivacaine", "Methylthioninium chloride", "Glycopyrronium"} {
		p := g.of(t, name)
		if !strings.Contains(p.text(), name) || p.run(t, firstWord(name)).Size < 2500 {
			t.Errorf("got %q, want %s whole", p.text(), name)
		}
	}
	// What fits nowhere is refused, and what does not fit here is not cut.
	one := fmt.Sprintf(theSession, "") + "[[patient.syringe]]\ndrug = \"methylthioninium chloride\"\npresentation = \"vial 50 mg in 5 mL\"\namount = \"50 mg\"\n"
	_, told, code := prepareText(t, one, "--stock", "roll-40x15", "--infusion-stock", "roll-40x15")
	if code != exitRefused || !strings.Contains(told, "label-too-small") || !strings.Contains(told, "use stock ") {
		t.Errorf("exit %d: %s, want a refusal that names a larger stock", code, told)
	}
}

func noScaling(t *testing.T, _ *gallery) {
	dir, told, code := prepareText(t, fmt.Sprintf(galleryOrder, ""))
	if code != exitMade {
		t.Fatal(told)
	}
	f := readback.Open(t, load(t, filepath.Join(dir, "labels.pdf")))
	if !f.NoScaling() {
		t.Error("the file lets the printer scale its pages")
	}
	length := regexp.MustCompile(`^(\d+)\s*mm$`)
	rulers := 0
	for page := 1; page <= f.Pages(); page++ {
		img := f.Render(page, 300)
		for _, r := range f.Text(page) {
			m := length.FindStringSubmatch(strings.TrimSpace(strings.ReplaceAll(r.Text, "\u00a0", " ")))
			if m == nil {
				continue
			}
			rulers++
			// The ruler lies to the left of its own words, on their baseline.
			black, from, to := func(x ink.Micrometre) bool {
				return isDark(readback.At(img, x, r.StartY, 300)) || isDark(readback.At(img, x, r.StartY-80, 300)) || isDark(readback.At(img, x, r.StartY+80, 300))
			}, ink.Micrometre(0), ink.Micrometre(0)
			for x := r.StartX - 400; x > 0 && (to == 0 || black(x)); x -= 20 {
				if black(x) {
					if to == 0 {
						to = x
					}
					from = x
				}
			}
			var mm int
			fmt.Sscan(m[1], &mm)
			if got := to - from; got < ink.MM(int64(mm))-250 || got > ink.MM(int64(mm))+350 {
				t.Errorf("page %d: the ruler of %d mm is %d micrometres long", page, mm, got)
			}
		}
	}
	if rulers < f.Pages() {
		t.Errorf("got %d rulers on %d sheets", rulers, f.Pages())
	}
}

func colourIsData(t *testing.T, g *gallery) {
	// No colour is worked out from another: what stands on the page is the value
	// of the table, class by class, to the last step but the renderer's rounding.
	for name, p := range g.pages {
		c, _ := labels.ClassOf(g.class(p))
		b := c.Background()
		if got := p.at(220, p.h*54/100); !c.Dim() && !near(got, ink.Colour{R: b.R, G: b.G, B: b.B}) {
			t.Errorf("%s: got %v, want %v of the table", name, got, b)
		}
	}
	t.Log("that a printed ink looks like its screen value no test on a screen can show: a printed page has to be held against a colour guide by eye")
}

func monoKeepsCues(t *testing.T, _ *gallery) {
	g := newGallery(t, "", "--mono", "--stock", "roll-40x15", "--infusion-stock", "roll-70x37")
	for name, p := range g.pages {
		c, _ := labels.ClassOf(g.class(p))
		if !strings.Contains(p.text(), c.Word) {
			t.Errorf("%s: got %q, want the class word", name, p.text())
		}
		if c.Stripes && len(starts(p, ink.Black, p.h/10)) < 8 {
			t.Errorf("%s: got no stripes", name)
		}
		for y := ink.Micrometre(100); y < p.h; y += 300 {
			for x := ink.Micrometre(100); x < p.w; x += 300 {
				if px := p.at(x, y); max(px.R, px.G, px.B)-min(px.R, px.G, px.B) > 6 {
					t.Fatalf("%s: got a colour, %v", name, px)
				}
			}
		}
	}
}

func wordOnEveryLabel(t *testing.T, g *gallery) {
	for name, p := range g.pages {
		c, _ := labels.ClassOf(g.class(p))
		if word := p.run(t, c.Word); word.StartY < p.h*3/4 {
			t.Errorf("%s: got the class word %d from the top of %d", name, word.StartY, p.h)
		}
	}
}

func routeWithoutColour(t *testing.T, g *gallery) {
	// The palette of routes has yellow for neural: an epidural syringe keeps the
	// grey of its class and says the route in words.
	p := g.of(t, "Levobupivacaine")
	if !strings.Contains(p.text(), "epidural") {
		t.Errorf("got %q, want the route in words", p.text())
	}
	for y := ink.Micrometre(100); y < p.h; y += 200 {
		for x := ink.Micrometre(100); x < p.w; x += 200 {
			c := p.at(x, y)
			if max(c.R, c.G, c.B)-min(c.R, c.G, c.B) > 24 { // the class grey has 15
				t.Fatalf("got the colour %v on the label", c)
			}
		}
	}
}

func barcodeClear(t *testing.T, g *gallery) {
	for name, p := range g.pages {
		left, top, right, low := symbolOn(p)
		if right == 0 {
			t.Errorf("%s: found no barcode", name)
			continue
		}
		for _, r := range p.runs {
			if r.X < right && r.X+r.W-60 > left && r.Y < low && r.Y+r.H-60 > top {
				t.Errorf("%s: %q meets the barcode", name, r.Text)
			}
		}
		for _, q := range []ink.Point{{X: left - 150, Y: (top + low) / 2}, {X: right + 150, Y: (top + low) / 2}, {X: (left + right) / 2, Y: top - 150}, {X: (left + right) / 2, Y: low + 150}} {
			if q.X < p.w && q.Y < p.h && p.at(q.X, q.Y) != ink.White {
				t.Errorf("%s: the quiet zone is not white: %v", name, p.at(q.X, q.Y))
			}
		}
	}
}

// symbolOn finds the barcode by its solid lower and left borders, as a reader
// does: left, top, right, low.
func symbolOn(p *labelPage) (left, top, right, low ink.Micrometre) {
	for low = p.h - 100; low > p.h/2; low -= 40 {
		for x := p.w / 2; x < p.w; x += 40 {
			if !isDark(p.at(x, low)) {
				continue
			}
			left = x
			for x < p.w && isDark(p.at(x, low)) {
				x += 40
			}
			if x-left < 4500 || x-left > 14_000 {
				continue
			}
			top = low
			for top > 0 && isDark(p.at(left+120, top)) {
				top -= 40
			}
			if low-top > 4500 {
				return left, top, x, low
			}
		}
	}
	return 0, 0, 0, 0
}

func oneEdition(t *testing.T, _ *gallery) {
	old := fmt.Sprintf(theSession, `edition = "2008"`) + "[[patient.syringe]]\ndrug = \"sugammadex\"\npresentation = \"vial 200 mg in 2 mL\"\namount = \"200 mg\"\n"
	dir, told, code := prepareText(t, old)
	if code != exitMade {
		t.Fatal(told)
	}
	data := load(t, filepath.Join(dir, "labels.pdf"))
	if f := readback.Open(t, data); !strings.Contains(f.About("Subject"), "ISO 26825:2008") || !strings.Contains(f.AllText(1), "ISO 26825:2008") {
		t.Errorf("got subject %q, want the edition in the file and on the sheet", f.About("Subject"))
	}
	sheet := readback.Open(t, load(t, filepath.Join(dir, "draw-up.pdf"))).AllText(1)
	if !strings.Contains(told, "label-edition") || !strings.Contains(sheet, "older edition") {
		t.Errorf("got %q, want the warning of the change-over", told)
	}
	// Two orders of one run with two editions are refused, and nothing is written.
	var out, errs bytes.Buffer
	code = run([]string{"prepare", filepath.Join(dir, "order.toml"), demo, "--out", t.TempDir()}, strings.NewReader(""), &out, &errs)
	if code != exitRefused || !strings.Contains(errs.String(), "two schemes") {
		t.Errorf("exit %d: %s, want a refusal", code, errs.String())
	}
}

func modestClaim(t *testing.T, g *gallery) {
	claim := regexp.MustCompile(`ISO\s+26825[^.]{0,30}`)
	seen := 0
	for _, name := range []string{"labels.pdf", "draw-up.pdf", "check-sheets.pdf", "pump-cards.pdf"} {
		f := readback.Open(t, load(t, filepath.Join(g.dir, name)))
		text := g.paper(t, name) + f.About("Subject") + f.About("Title") + g.notes
		for _, found := range claim.FindAllString(text, -1) {
			seen++
			if !strings.HasPrefix(strings.Join(strings.Fields(found), " "), "ISO 26825:2020, 5") {
				t.Errorf("%s claims %q", name, found)
			}
		}
		if strings.Contains(text, "conform") || strings.Contains(text, "complies") {
			t.Errorf("%s claims to conform", name)
		}
	}
	if seen == 0 {
		t.Error("found no word on the standard at all")
	}
}

func fontsEmbedded(t *testing.T, g *gallery) {
	for _, name := range []string{"labels.pdf", "draw-up.pdf", "check-sheets.pdf", "pump-cards.pdf"} {
		data := load(t, filepath.Join(g.dir, name))
		fonts, files := bytes.Count(data, []byte("/Type /FontDescriptor")), bytes.Count(data, []byte("/FontFile2 "))
		if fonts == 0 || fonts != files {
			t.Errorf("%s: got %d fonts and %d of them embedded", name, fonts, files)
		}
		if bytes.Contains(data, []byte("/BaseFont /Helvetica")) || bytes.Contains(data, []byte("/BaseFont /Times")) {
			t.Errorf("%s names a font of the reader's computer", name)
		}
	}
}

func noBoxes(t *testing.T, _ *gallery) {
	text := strings.Replace(fmt.Sprintf(theSession, ""), "A. Sample", "A. 薬師", 1) + "[[patient.syringe]]\ndrug = \"sugammadex\"\npresentation = \"vial 200 mg in 2 mL\"\namount = \"200 mg\"\n"
	dir, told, code := prepareText(t, text)
	if code != exitRefused || !strings.Contains(told, "glyph-missing") {
		t.Errorf("exit %d: %s, want a refusal", code, told)
	}
	if files, _ := filepath.Glob(filepath.Join(dir, "*.pdf")); len(files) > 0 {
		t.Errorf("got %v written", files)
	}
}

// A name in capitals throughout is refused wherever it comes from, and a
// tall-man form is not made anew.
func noCapitals(t *testing.T, g *gallery) {
	for name, p := range g.pages {
		word := strings.TrimSpace(p.run(t, firstWord(name)).Text)
		if word == strings.ToUpper(word) || word == strings.ToLower(word) {
			t.Errorf("got %q as a name", word)
		}
	}
	for _, name := range []string{"EPHEDRINE", "ePHEDRINE", "ephedrine"} {
		c, _ := labels.ClassOf("VAS")
		l := labels.Label{Class: c, Name: name, Concentration: labels.Cell{Text: "3 mg/mL", Figure: "concentration"}, UseBy: labels.Line{{Text: "01 Dec 2026 19:30", Figure: "use.by"}}}
		if len(l.Check()) == 0 {
			t.Errorf("%s is accepted as a name", name)
		}
	}
	if found := lint.UK().Printed("EPI 1 mg"); len(found) == 0 {
		t.Error("letters for a name pass")
	}
}
