package main

import (
	"bytes"
	"fmt"
	"math/big"
	"path/filepath"
	"regexp"
	"slices"
	"strings"
	"testing"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/quantity/lint"
	"drawup/labels"
	"drawup/layouts/pdf/readback"
)

// Proofs about what a label says.

// labelText prepares an order and gives the text of its labels.
func labelText(t *testing.T, order string, args ...string) string {
	t.Helper()
	dir, told, code := prepareText(t, order, args...)
	if code != exitMade {
		t.Fatalf("exit %d: %s", code, told)
	}
	f := readback.Open(t, load(t, filepath.Join(dir, "labels.pdf")))
	var all strings.Builder
	for n := 1; n <= f.Pages(); n++ {
		all.WriteString(f.AllText(n) + "\n")
	}
	return strings.ReplaceAll(all.String(), "\u00a0", " ")
}

// one is an order of one syringe.
func one(site, lines string) string {
	return fmt.Sprintf(theSession, site) + "[[patient.syringe]]\n" + lines
}

func tallManKept(t *testing.T, _ *gallery) {
	f, err := formulary.Default()
	if err != nil {
		t.Fatal(err)
	}
	kept := 0
	for _, list := range f.TallMan {
		for _, name := range list.Names {
			kept++
			if got := labels.Capital(name); got != name {
				t.Errorf("got %q for the listed form %q", got, name)
			}
		}
	}
	if kept < 5 {
		t.Fatalf("got %d forms on the lists", kept)
	}
	list := f.TallMan[0]
	infusion := fmt.Sprintf(theSession, fmt.Sprintf("tall_man = %q", list.Jurisdiction)) +
		"[[patient.infusion]]\ndrug = \"dobutamine\"\npresentation = \"ampoule 250 mg in 50 mL\"\nmix = \"250 mg in 50 mL\"\nline = \"central\"\nstart = \"5 microgram/kg/min\"\n"
	if text := labelText(t, infusion); !strings.Contains(text, "DOBUTamine") || strings.Contains(text, "Dobutamine") {
		t.Errorf("got %q, want the listed form as it stands", text)
	}
}

// classesOf is the class that the formulary gives some drugs.
func classesOf(t *testing.T, want map[string]string) {
	t.Helper()
	f, err := formulary.Default()
	if err != nil {
		t.Fatal(err)
	}
	for name, class := range want {
		if d, _, ok := f.Find(name); !ok || d.Class != class {
			t.Errorf("%s: got class %q, want %s", name, d.Class, class)
		}
	}
}

// By the code's first letters each of these would be in another class: M03 is
// muscle relaxants, N05A antipsychotics, N07BC drugs for addiction, V03AB
// antidotes, C01 the heart (WHO index).
func classFromData(t *testing.T, g *gallery) {
	classesOf(t, map[string]string{"dantrolene": "OTH", "droperidol": "AEM", "diamorphine": "OPI", "flumazenil": "BZD-A", "naloxone": "OPI-A", "sugammadex": "NMB-R",
		"adrenaline": "ADR", "noradrenaline": "VAS", "glyceryl trinitrate": "HYP"})
	if text := g.of(t, "Dantrolene").text(); !strings.Contains(text, "OTHER") || strings.Contains(text, "RELAXANT") {
		t.Errorf("got %q for dantrolene, want no relaxant", text)
	}
}

func newerDrugs(t *testing.T, g *gallery) {
	classesOf(t, map[string]string{"remimazolam": "BZD", "ketorolac": "OTH", "tranexamic acid": "OTH", "esketamine": "IND", "dexmedetomidine": "OTH"})
	for _, name := range []string{"Ketorolac", "Tranexamic acid"} {
		if text := g.of(t, name).text(); !strings.Contains(text, "OTHER") {
			t.Errorf("got %q for %s", text, name)
		}
	}
}

func exactNames(t *testing.T, g *gallery) {
	for name, never := range map[string]string{"Esketamine": "Ketamine", "Levobupivacaine": " Bupivacaine", "Ephedrine": "Epinephrine", "Metaraminol": "Noradrenaline"} {
		if text := g.of(t, name).text(); !strings.Contains(text, name) || strings.Contains(text, never) {
			t.Errorf("got %q on the label of %s", text, name)
		}
	}
}

func noFloats(t *testing.T, g *gallery) {
	for name, p := range g.pages {
		for _, f := range lint.UK().Printed(p.text()) {
			if f.Rule.Code == "N28" || f.Rule.Code == "N21" {
				t.Errorf("%s: %s in %q", name, f.Rule.Code, p.text())
			}
		}
	}
	// In binary numbers a tenth and two tenths are 0.30000000000000004, and a
	// hundred-thousandth of a gram prints as 1e-05.
	for args, want := range map[string]string{
		"mix|--amount|0.3 mg|--final|3 mL|--strength|1 mg/mL": "100 micrograms/mL",
		"convert|--from|0.00001 g|--to|microgram":             "10 micrograms",
		"convert|--from|0.1 mg|--to|microgram":                "100 micrograms",
	} {
		var out, errs bytes.Buffer
		if code := run(strings.Split(args, "|"), strings.NewReader(""), &out, &errs); code != exitMade || !strings.Contains(out.String(), want) {
			t.Errorf("%s: exit %d, got %q %q, want %q", args, code, out.String(), errs.String(), want)
		}
	}
}

func noTrailingZero(t *testing.T, g *gallery) {
	text := labelText(t, one("", "drug = \"adrenaline\"\npresentation = \"ampoule 1 mg in 10 mL\"\namount = \"1.0 mg\"\n"))
	if !strings.Contains(text, "1 mg in 10 mL") || strings.Contains(text, "1.0") {
		t.Errorf("got %q, want 1 mg in 10 mL", text)
	}
	zero := regexp.MustCompile(`\d\.\d*0\s*(?:mg|mL|g|micrograms?|units?)\b`)
	for _, paper := range []string{"draw-up.pdf", "check-sheets.pdf", "pump-cards.pdf"} {
		if found := zero.FindString(g.paper(t, paper)); found != "" {
			t.Errorf("%s: got %q", paper, found)
		}
	}
}

func oneComma(t *testing.T, _ *gallery) {
	heparin := "drug = \"heparin\"\npresentation = \"ampoule 5000 units in 5 mL\"\namount = \"5000 units\"\n"
	for style, want := range map[string]string{"uk": "5,000 units", "us": "5,000 units", "si": "5 000 units"} {
		if text := labelText(t, one(fmt.Sprintf("style = %q", style), heparin)); !strings.Contains(text, want) {
			t.Errorf("%s: got %q, want %q", style, text, want)
		}
	}
	_, told, code := prepareText(t, one("", "drug = \"heparin\"\npresentation = \"ampoule 5000 units in 5 mL\"\namount = \"1,5 units\"\n"))
	if code != exitRefused || !strings.Contains(told, "number-with-comma") {
		t.Errorf("exit %d: %s, want a comma refused", code, told)
	}
}

func noMu(t *testing.T, g *gallery) {
	if text := g.of(t, "Fentanyl").text(); !strings.Contains(text, "100 micrograms in 2 mL") || strings.ContainsAny(text, "\u00b5\u03bc") {
		t.Errorf("got %q of an order typed with the Greek letter", text)
	}
	text := labelText(t, one("", "drug = \"fentanyl\"\npresentation = \"ampoule 100 microgram in 2 mL\"\namount = \"100 \u03bcg\"\n"))
	if !strings.Contains(text, "100 micrograms in 2 mL") {
		t.Errorf("got %q of the other code point", text)
	}
	for _, paper := range []string{"draw-up.pdf", "check-sheets.pdf"} {
		if strings.ContainsAny(g.paper(t, paper), "\u00b5\u03bc") {
			t.Errorf("%s has the Greek letter", paper)
		}
	}
}

func microgramWords(t *testing.T, g *gallery) {
	fentanyl := "drug = \"fentanyl\"\npresentation = \"ampoule 100 microgram in 2 mL\"\namount = \"100 mcg\"\n"
	if text := labelText(t, one("style = \"us\"", fentanyl)); !strings.Contains(text, "50 mcg/mL") || strings.Contains(text, "microgram") {
		t.Errorf("us: got %q", text)
	}
	if text := labelText(t, one("style = \"uk\"", fentanyl)); !strings.Contains(text, "50 micrograms/mL") || strings.Contains(text, "mcg") {
		t.Errorf("uk: got %q", text)
	}
	cut := regexp.MustCompile(`\bmicrogs?\b|\bmicrogra\b`)
	for name, p := range g.pages {
		if found := cut.FindString(p.text()); found != "" {
			t.Errorf("%s: got %q", name, found)
		}
	}
}

// 30 mg in 1 mL made up to 10 mL are 3 mg/mL.
func syringeNotAmpoule(t *testing.T, g *gallery) {
	if text := g.of(t, "Ephedrine").text(); !strings.Contains(text, "3 mg/mL") || strings.Contains(text, "30 mg/mL") || !strings.Contains(text, "30 mg in 10 mL") {
		t.Errorf("got %q, want what is in the syringe", text)
	}
}

// 8 mL added to a full bag of 100 mL make 108 mL, and 8 mg in it 74.1
// micrograms/mL; made up to 100 mL they are 80 (rule R5).
func overfill(t *testing.T, _ *gallery) {
	bag := fmt.Sprintf(theSession, "") + "[[patient.infusion]]\ndrug = \"noradrenaline\"\npresentation = \"ampoule 4 mg in 4 mL\"\nmix = \"8 mg in 100 mL\"\nmethod = \"add to\"\ndiluent = \"glucose 5 %\"\nline = \"central\"\nstart = \"0.05 microgram/kg/min\"\n"
	if text := labelText(t, bag); !strings.Contains(text, "74.1 micrograms/mL") || !strings.Contains(text, "108 mL") {
		t.Errorf("got %q, want the sum with the overfill", text)
	}
}

// Amount and concentration as printed agree within half a per cent.
func amountsAgree(t *testing.T, g *gallery) {
	s := quantity.UK()
	for _, x := range g.plan.Syringes {
		amount, err1 := quantity.ParseAmount(plainOf(x.Amount.Printed))
		volume, err2 := quantity.ParseVolume(plainOf(x.FinalVolume.Printed))
		conc, err3 := quantity.ParseConcentration(plainOf(x.Concentration.Printed))
		holds, err4 := volume.Holds(conc)
		if err1 != nil || err2 != nil || err3 != nil || err4 != nil {
			t.Fatal(err1, err2, err3, err4)
		}
		share, err := holds.Share(amount)
		if err != nil {
			t.Fatal(err)
		}
		if off := new(big.Rat).Abs(new(big.Rat).Sub(share, big.NewRat(1, 1))); off.Cmp(big.NewRat(5, 1000)) > 0 {
			t.Errorf("%s: %s and %s of %s disagree, %s", x.Drug, x.Amount.Printed, x.FinalVolume.Printed, x.Concentration.Printed, s.Amount(holds))
		}
	}
}

func plainOf(printed string) string { return strings.ReplaceAll(printed, ",", "") }

func baseStated(t *testing.T, g *gallery) {
	p := g.of(t, "Noradrenaline")
	if text := p.text(); !strings.Contains(text, "80 micrograms/mL base") && !strings.Contains(text, "base") {
		t.Errorf("got %q, want base", text)
	}
	if found := lint.UK().Whole("Noradrenaline", []string{p.text()}); len(found) > 0 {
		t.Errorf("got %s on %q", found[0].Rule.Code, p.text())
	}
	if found := lint.UK().Whole("Noradrenaline", []string{"80 micrograms/mL", "4 mg in 50 mL"}); len(found) == 0 {
		t.Error("a label without the word passes")
	}
}

// 1 in n is 1000/n mg/mL (US Pharmacopeia, general chapter 7): typed, a ratio is
// echoed so and never printed; in a sentence it is refused with the hint.
func noRatio(t *testing.T, _ *gallery) {
	text := labelText(t, one("", "drug = \"adrenaline\"\npresentation = \"ampoule 1 mg in 10 mL\"\nconcentration = \"1:10000\"\nvolume = \"10 mL\"\n"))
	if !strings.Contains(text, "100 micrograms/mL") || strings.Contains(text, "1:1") || strings.Contains(text, "1 in 10") {
		t.Errorf("got %q, want 100 micrograms/mL", text)
	}
	var out, errs bytes.Buffer
	if code := run([]string{"wording", "adrenaline 1:10000"}, strings.NewReader(""), &out, &errs); code != exitRefused || !strings.Contains(errs.String(), "N08") || !strings.Contains(errs.String(), "100 micrograms/mL") {
		t.Errorf("exit %d: %s, want N08 with the hint", code, errs.String())
	}
}

func noPerCentAlone(t *testing.T, g *gallery) {
	for _, name := range []string{"Lidocaine", "Levobupivacaine"} {
		if text := g.of(t, name).text(); !strings.Contains(text, "mg/mL") || strings.Contains(text, "%") {
			t.Errorf("got %q, want mg/mL", text)
		}
	}
	if found := lint.UK().Printed("lidocaine 2 %"); len(found) != 1 || found[0].Rule.Code != "N13" {
		t.Errorf("got %v, want N13", found)
	}
}

func unitsInFull(t *testing.T, g *gallery) {
	text := g.of(t, "Heparin").text()
	if !strings.Contains(text, "5,000 units in 5 mL") || !strings.Contains(text, "1,000 units/mL") || regexp.MustCompile(`\bI?U\b`).MatchString(text) {
		t.Errorf("got %q, want units in full", text)
	}
	if class := g.class(g.of(t, "Heparin")); class != "HEP" {
		t.Errorf("got class %s", class)
	}
}

// Twelve hours from 20:00 on 24 October 2026 end at 07:00 in Berlin, where the
// clocks go back in that night (European Union, last Sunday of October).
func useByTime(t *testing.T, g *gallery) {
	for name, p := range g.pages {
		if !regexp.MustCompile(`use by \d{2} [A-Z][a-z]{2} \d{4} \d{2}:\d{2}`).MatchString(p.text()) {
			t.Errorf("%s: got %q, want use-by with its time", name, p.text())
		}
	}
	night := strings.NewReplacer(`date = "2026-12-01"`, `date = "2026-10-24"`, `prepared = "07:30"`, "prepared = \"20:00\"\nzone = \"Europe/Berlin\"").
		Replace(one("", "drug = \"adrenaline\"\npresentation = \"ampoule 1 mg in 10 mL\"\namount = \"1 mg\"\n"))
	if text := labelText(t, night); !strings.Contains(text, "use by 25 Oct 2026 07:00") {
		t.Errorf("got %q, want 07:00 after the clock change", text)
	}
}

// Printed three hours after it was filled, a label says when it was filled and
// counts from there.
func useByFromFilling(t *testing.T, _ *gallery) {
	text := one("", "drug = \"adrenaline\"\npresentation = \"ampoule 1 mg in 10 mL\"\namount = \"1 mg\"\n")
	if got := labelText(t, text, "--at", "2026-12-01 10:30"); !strings.Contains(got, "use by 01 Dec 2026 22:30") || !strings.Contains(got, "made 01 Dec 2026 10:30") {
		t.Errorf("got %q, want 12 h from the time given", got)
	}
	if got := labelText(t, text); !strings.Contains(got, "use by 01 Dec 2026 19:30") {
		t.Errorf("got %q, want 12 h from the order's time, whenever it is printed", got)
	}
}

func patientWhereNeeded(t *testing.T, g *gallery) {
	for _, name := range []string{"Etomidate", "Fentanyl", "Adrenaline"} {
		if text := g.of(t, name).text(); strings.Contains(text, "HM-01") {
			t.Errorf("%s: got the patient on a theatre label that goes by no weight: %q", name, text)
		}
	}
	for _, name := range []string{"Noradrenaline", "Glyceryl trinitrate", "Dexmedetomidine"} {
		if text := g.of(t, name).text(); !strings.Contains(text, "patient HM-01") {
			t.Errorf("%s: got no patient on an infusion: %q", name, text)
		}
	}
}

// The page of the second person has no result on it: neither the volume to draw
// nor the concentration that comes of it.
func secondPageEmpty(t *testing.T, g *gallery) {
	f := readback.Open(t, load(t, filepath.Join(g.dir, "check-sheets.pdf")))
	blind := 0
	for n := 1; n <= f.Pages(); n++ {
		text := strings.ReplaceAll(f.AllText(n), "\u00a0", " ")
		if !strings.Contains(text, "the second person") || !strings.Contains(text, "Noradrenaline") {
			continue
		}
		blind++
		for _, answer := range []string{"80 micrograms/mL", "2.6 mL/h", "46 mL"} {
			if strings.Contains(text, answer) {
				t.Errorf("page %d shows %q", n, answer)
			}
		}
	}
	if blind == 0 {
		t.Error("found no page for the second person")
	}
}

// There are as many labels as syringes, each with a number of its own; printing
// them all before filling is told.
func oneLabelASyringe(t *testing.T, g *gallery) {
	if len(g.pages) != len(g.plan.Syringes) || g.labels.Pages() != len(g.plan.Syringes) {
		t.Errorf("got %d labels for %d syringes", g.labels.Pages(), len(g.plan.Syringes))
	}
	var serials []string
	for _, s := range g.plan.Syringes {
		serials = append(serials, s.Serial)
	}
	slices.Sort(serials)
	if len(slices.Compact(serials)) != len(g.plan.Syringes) {
		t.Error("two syringes share a number")
	}
	for name, p := range g.pages {
		if !strings.Contains(p.text(), fmt.Sprintf("%03d", p.number)) {
			t.Errorf("%s: got %q, want its own number", name, p.text())
		}
	}
	if !strings.Contains(g.notes, "labels-printed-together") {
		t.Error("printing all at once is not told")
	}
}

func routeInWords(t *testing.T, g *gallery) {
	for name, route := range map[string]string{"Noradrenaline": "IV", "Glyceryl trinitrate": "IV", "Levobupivacaine": "epidural", "Lidocaine": "infiltration"} {
		if text := g.of(t, name).text(); !strings.Contains(text, route) {
			t.Errorf("%s: got %q, want the route in words", name, text)
		}
	}
	t.Log("a label for a line is another kind of label than those of a syringe; where one is printed its own tests want the route on it")
}

// Neostigmine and glycopyrronium come ready mixed: both names, and for each what
// 1 mL of the mixture holds.
func bothDrugsNamed(t *testing.T, g *gallery) {
	for name, p := range g.pages {
		if text := p.text(); name == "Neostigmine (2)" || name == "Neostigmine" && strings.Contains(text, "Glycopyrronium") {
			for _, want := range []string{"with Glycopyrronium", "2.5 mg/mL Neostigmine", "500 micrograms/mL Glycopyrronium"} {
				if !strings.Contains(text, want) {
					t.Errorf("got %q, want %q", text, want)
				}
			}
			return
		}
	}
	t.Error("found no label of a mixture")
}

// A name that is nearly another is refused and the names like it are listed, so
// that a person chooses.
func nothingFilledIn(t *testing.T, _ *gallery) {
	for typed, near := range map[string][]string{"dopamin": {"dopamine"}, "dobutamin": {"dobutamine"}} {
		_, told, code := prepareText(t, one("", fmt.Sprintf("drug = %q\namount = \"1 mg\"\n", typed)))
		if code != exitRefused || !strings.Contains(told, "drug-unknown") {
			t.Errorf("%s: exit %d: %s", typed, code, told)
		}
		for _, name := range near {
			if !strings.Contains(told, name) {
				t.Errorf("%s: got %q, want %s to be named", typed, told, name)
			}
		}
	}
}
