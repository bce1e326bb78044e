package main

import (
	"bytes"
	"encoding/json"
	"fmt"
	"image"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"

	"drawup/layouts/ink"
	"drawup/layouts/pdf/readback"
)

// The 46 mistakes that label tools commonly make (label rules, part 7), each
// with the proof that this one cannot make it: by text, by mark or by pixel on
// the printed page, from an order to the PDF. What paper cannot show is said by
// name, with the reason.

// A mistake has the name of the list and its proof.
type mistake struct {
	name  string
	prove func(t *testing.T, g *gallery)
}

// mistakes is the list in its own order.
func mistakes() []mistake {
	return []mistake{
		{"01 stripes lean the wrong way", stripesLeanRight},
		{"02 stripe width taken along the label", stripeWidthAcross},
		{"03 stripes behind or below the name", noStripesAtName},
		{"04 stripe band under 20 or 15 per cent", stripesWideEnough},
		{"05 only the antagonist gets stripes", hypotensivesStriped},
		{"06 reversal without the line or in another colour", reversalLine},
		{"07 black bar on the wrong drugs or over the whole label", barWhereItBelongs},
		{"08 red letters on the black bar", lettersOnBar},
		{"09 white text on a class colour", noWhiteText},
		{"10 name all in capitals", noCapitals},
		{"11 title case applied to tall-man entries", tallManKept},
		{"12 height checked on the point size", heightOfLetters},
		{"13 name shrunk or cut to fit", longNames},
		{"14 printer scaling", noScaling},
		{"15 screen colour mistaken for the ink", colourIsData},
		{"16 monochrome printing accepted silently", monoKeepsCues},
		{"17 colour the only cue", wordOnEveryLabel},
		{"18 class derived from the code", classFromData},
		{"19 newer drugs in the wrong class", newerDrugs},
		{"20 a neighbouring name printed", exactNames},
		{"21 floating-point output", noFloats},
		{"22 trailing zero from fixed formatting", noTrailingZero},
		{"23 decimal comma and thousands comma mixed", oneComma},
		{"24 Greek mu lost or boxed", noMu},
		{"25 mcg on a UK label, micrograms cut", microgramWords},
		{"26 strength of the ampoule for that of the syringe", syringeNotAmpoule},
		{"27 overfill", overfill},
		{"28 amount and concentration disagree", amountsAgree},
		{"29 noradrenaline base or tartrate not stated", baseStated},
		{"30 adrenaline as a ratio", noRatio},
		{"31 per cent alone", noPerCentAlone},
		{"32 units as IU or U", unitsInFull},
		{"33 expiry without time, shifted by the clock change", useByTime},
		{"34 use-by from the time of printing", useByFromFilling},
		{"35 patient forced on theatre labels, missing on infusions", patientWhereNeeded},
		{"36 second page filled in", secondPageEmpty},
		{"37 a strip of equal labels", oneLabelASyringe},
		{"38 line label like a syringe label, without route", routeInWords},
		{"39 route colour as background", routeWithoutColour},
		{"40 two drugs under one name", bothDrugsNamed},
		{"41 barcode over name or stripes", barcodeClear},
		{"42 designs of two editions mixed", oneEdition},
		{"43 claiming the whole standard", modestClaim},
		{"44 fonts not embedded", fontsEmbedded},
		{"45 letters that the font lacks", noBoxes},
		{"46 a neighbouring name filled in", nothingFilledIn},
	}
}

func TestMistakes(t *testing.T) {
	list := mistakes()
	if len(list) != 46 {
		t.Fatalf("got %d mistakes, want the 46 of the list", len(list))
	}
	g := newGallery(t, "", "--stock", "roll-40x15", "--infusion-stock", "roll-70x37")
	for i, m := range list {
		if !strings.HasPrefix(m.name, fmt.Sprintf("%02d ", i+1)) {
			t.Errorf("got %q in place %d", m.name, i+1)
		}
		t.Run(m.name, func(t *testing.T) { m.prove(t, g) })
	}
}

// theSession is an invented theatre and patient.
const theSession = `[session]
place = "Harbour Theatre 2 (invented)"
date = "2026-12-01"
prepared = "07:30"
preparer = "A. Sample"
invented = true
[site]
bolus_use_by = "12 h"
%s
[[patient]]
id = "HM-01"
sex = "female"
age = "40 years"
height = "168 cm"
weight = "70 kg"
`

// galleryOrder asks for a syringe of every class, the drugs that are commonly
// given a wrong one, the longest names, and infusions.
const galleryOrder = theSession + `
  [[patient.syringe]]
  drug = "etomidate"
  presentation = "ampoule 20 mg in 10 mL"
  amount = "20 mg"
  [[patient.syringe]]
  drug = "midazolam"
  presentation = "ampoule 5 mg in 5 mL"
  amount = "5 mg"
  [[patient.syringe]]
  drug = "flumazenil"
  presentation = "ampoule 0.5 mg in 5 mL"
  amount = "0.5 mg"
  [[patient.syringe]]
  drug = "rocuronium"
  presentation = "vial 50 mg in 5 mL"
  amount = "50 mg"
  [[patient.syringe]]
  drug = "suxamethonium"
  presentation = "ampoule 100 mg in 2 mL"
  amount = "100 mg"
  [[patient.syringe]]
  drug = "neostigmine"
  presentation = "ampoule 2.5 mg in 1 mL"
  amount = "2.5 mg"
  [[patient.syringe]]
  drug = "sugammadex"
  presentation = "vial 200 mg in 2 mL"
  amount = "200 mg"
  [[patient.syringe]]
  drug = "fentanyl"
  presentation = "ampoule 100 microgram in 2 mL"
  amount = "100 µg"
  [[patient.syringe]]
  drug = "naloxone"
  presentation = "ampoule 400 microgram in 1 mL"
  amount = "400 microgram"
  [[patient.syringe]]
  drug = "metaraminol"
  presentation = "ampoule 5 mg in 10 mL"
  amount = "5 mg"
  [[patient.syringe]]
  drug = "ephedrine"
  presentation = "ampoule 30 mg in 1 mL"
  concentration = "3 mg/mL"
  volume = "10 mL"
  diluent = "sodium chloride 0.9 %%"
  [[patient.syringe]]
  drug = "adrenaline"
  presentation = "ampoule 1 mg in 10 mL"
  amount = "1 mg"
  [[patient.syringe]]
  drug = "labetalol"
  presentation = "ampoule 100 mg in 20 mL"
  amount = "100 mg"
  [[patient.syringe]]
  drug = "lidocaine"
  presentation = "ampoule 100 mg in 5 mL"
  route = "infiltration"
  amount = "100 mg"
  [[patient.syringe]]
  drug = "glycopyrronium"
  presentation = "ampoule 600 microgram in 3 mL"
  amount = "600 microgram"
  [[patient.syringe]]
  drug = "ondansetron"
  presentation = "ampoule 4 mg in 2 mL"
  amount = "4 mg"
  [[patient.syringe]]
  drug = "droperidol"
  presentation = "ampoule 2.5 mg in 1 mL"
  amount = "2.5 mg"
  [[patient.syringe]]
  drug = "heparin"
  presentation = "ampoule 5000 units in 5 mL"
  amount = "5000 units"
  [[patient.syringe]]
  drug = "protamine"
  presentation = "ampoule 50 mg in 5 mL"
  amount = "50 mg"
  [[patient.syringe]]
  drug = "argatroban"
  presentation = "vial 50 mg in 50 mL"
  amount = "50 mg"
  [[patient.syringe]]
  drug = "tranexamic acid"
  presentation = "ampoule 500 mg in 5 mL"
  amount = "500 mg"
  [[patient.syringe]]
  drug = "dantrolene"
  presentation = "vial 20 mg"
  amount = "10 mg"
  [[patient.syringe]]
  drug = "ketorolac"
  presentation = "ampoule 30 mg in 1 mL"
  amount = "30 mg"
  [[patient.syringe]]
  drug = "methylthioninium chloride"
  presentation = "ampoule 50 mg in 10 mL"
  amount = "50 mg"
  [[patient.syringe]]
  drug = "esketamine"
  presentation = "ampoule 25 mg in 5 mL"
  amount = "25 mg"
  [[patient.syringe]]
  drug = "ketamine"
  presentation = "ampoule 50 mg in 5 mL"
  amount = "50 mg"
  [[patient.syringe]]
  drug = "neostigmine with glycopyrronium"
  presentation = "ampoule 2.5 mg with 0.5 mg in 1 mL"
  amount = "2.5 mg"
  [[patient.infusion]]
  drug = "noradrenaline"
  presentation = "ampoule 4 mg in 4 mL"
  standard = "4 mg in 50 mL"
  diluent = "glucose 5 %%"
  line = "central"
  start = "0.05 microgram/kg/min"
  [[patient.infusion]]
  drug = "glyceryl trinitrate"
  presentation = "vial 50 mg in 50 mL"
  mix = "50 mg in 50 mL"
  start = "10 microgram/min"
  [[patient.infusion]]
  drug = "dexmedetomidine"
  presentation = "vial 80 microgram in 20 mL"
  mix = "80 microgram in 20 mL"
  start = "0.2 microgram/kg/h"

[[patient]]
id = "HM-02"
sex = "male"
age = "50 years"
height = "180 cm"
weight = "80 kg"
  [[patient.syringe]]
  drug = "levobupivacaine"
  presentation = "ampoule 25 mg in 10 mL"
  route = "epidural"
  amount = "25 mg"
`

// A gallery is an order prepared for real: the document and the papers.
type gallery struct {
	dir    string
	labels *readback.File
	pages  map[string]*labelPage // by the drug's name on the label
	plan   planned
	notes  string
}

// A planned is what the proofs need of plan.json.
type planned struct {
	Syringes []struct {
		Number        int
		Drug, Class   string
		Serial        string
		Amount        struct{ Exact, Printed, Unit string }
		FinalVolume   struct{ Exact, Printed, Unit string } `json:"final_volume"`
		Concentration struct{ Exact, Printed, Unit string }
		UseBy         struct{ At string } `json:"use_by"`
	}
}

// A labelPage is one label on a page of its own, its panel the whole page.
type labelPage struct {
	number int
	file   *readback.File
	page   int
	w, h   ink.Micrometre
	runs   []readback.Run
	img    *image.RGBA
}

const pageDPI = 600

func (p *labelPage) at(x, y ink.Micrometre) ink.Colour {
	if p.img == nil {
		p.img = p.file.Render(p.page, pageDPI)
	}
	return readback.At(p.img, x, y, pageDPI)
}

// text is everything that the label says.
func (p *labelPage) text() string {
	var all []string
	for _, r := range p.runs {
		all = append(all, strings.TrimSpace(r.Text))
	}
	return strings.ReplaceAll(strings.Join(all, " "), "\u00a0", " ")
}

// run finds a piece of text by how it begins.
func (p *labelPage) run(t *testing.T, text string) readback.Run {
	t.Helper()
	for _, r := range p.runs {
		if strings.HasPrefix(r.Text, text) {
			return r
		}
	}
	t.Fatalf("got no %q among %q", text, p.text())
	return readback.Run{}
}

// prepareText prepares an order and returns its folder, what was told, and the
// exit code.
func prepareText(t *testing.T, text string, args ...string) (dir, told string, code int) {
	t.Helper()
	dir = t.TempDir()
	path := filepath.Join(dir, "order.toml")
	if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
		t.Fatal(err)
	}
	var out, errs bytes.Buffer
	code = run(append([]string{"prepare", path, "--out", dir}, args...), strings.NewReader(""), &out, &errs)
	return dir, out.String() + errs.String(), code
}

// newGallery prepares the gallery with more keys of the site.
func newGallery(t *testing.T, site string, args ...string) *gallery {
	t.Helper()
	dir, told, code := prepareText(t, fmt.Sprintf(galleryOrder, site), args...)
	if code != exitMade {
		t.Fatalf("exit %d: %s", code, told)
	}
	g := &gallery{dir: dir, notes: told, pages: map[string]*labelPage{}}
	if err := json.Unmarshal(load(t, filepath.Join(dir, planName)), &g.plan); err != nil {
		t.Fatal(err)
	}
	g.labels = readback.Open(t, load(t, filepath.Join(dir, "labels.pdf")))
	if marks := g.labels.Bookmarks(); len(marks) == g.labels.Pages() {
		for _, b := range marks {
			number, name, _ := strings.Cut(b.Title, " ")
			p := &labelPage{file: g.labels, page: b.Page, runs: g.labels.Text(b.Page)}
			p.w, p.h = g.labels.Size(b.Page)
			if _, err := fmt.Sscan(number, &p.number); err != nil {
				t.Fatal(err)
			}
			if _, twice := g.pages[name]; twice {
				name += " (2)"
			}
			g.pages[name] = p
		}
	}
	return g
}

// of is the label of a drug.
func (g *gallery) of(t *testing.T, name string) *labelPage {
	t.Helper()
	p := g.pages[name]
	if p == nil {
		t.Fatalf("there is no label of %s", name)
	}
	return p
}

// class is the class that the document gives the label's syringe.
func (g *gallery) class(p *labelPage) string {
	for _, s := range g.plan.Syringes {
		if s.Number == p.number {
			return s.Class
		}
	}
	return ""
}

// paper is the whole text of one of the files.
func (g *gallery) paper(t *testing.T, name string) string {
	t.Helper()
	f := readback.Open(t, load(t, filepath.Join(g.dir, name)))
	var all strings.Builder
	for n := 1; n <= f.Pages(); n++ {
		all.WriteString(f.AllText(n) + "\n")
	}
	return strings.ReplaceAll(all.String(), "\u00a0", " ")
}

// numberOf is a printed number without its unit and signs between thousands.
var numberOf = regexp.MustCompile(`^[0-9.,]+`)
