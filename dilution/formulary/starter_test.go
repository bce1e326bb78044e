package formulary_test

import (
	"fmt"
	"math/big"
	"os"
	"path/filepath"
	"regexp"
	"slices"
	"strings"
	"testing"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
)

func starter(t *testing.T) *formulary.Formulary {
	t.Helper()
	f, err := formulary.Default()
	if err != nil {
		t.Fatal(err)
	}
	return f
}

// rows reads the tab-separated files of a folder of testdata/formulary, without
// their heads.
func rows(t *testing.T, folder string, columns int) [][]string {
	t.Helper()
	files, err := filepath.Glob("../../testdata/formulary/" + folder + "/*.tsv")
	if err != nil || len(files) == 0 {
		t.Fatalf("no tables in %s: %v", folder, err)
	}
	var out [][]string
	for _, name := range files {
		out = append(out, table(t, name, columns)...)
	}
	return out
}

// table reads one tab-separated file without its head.
func table(t *testing.T, name string, columns int) [][]string {
	t.Helper()
	data, err := os.ReadFile(name)
	if err != nil {
		t.Fatal(err)
	}
	var out [][]string
	for i, line := range strings.Split(strings.TrimRight(string(data), "\n"), "\n") {
		cells := strings.Split(line, "\t")
		if len(cells) != columns {
			t.Fatalf("%s:%d: got %d columns, want %d", name, i+1, len(cells), columns)
		}
		if i > 0 {
			out = append(out, cells)
		}
	}
	return out
}

// wanted are the drugs that the starter formulary must hold at least: one for each
// block of the notes that were taken while reading, in their order.
const wanted = `etomidate, propofol, ketamine, esketamine, thiopental, methohexital, midazolam, diazepam, diazepam emulsion, lorazepam,
remimazolam, flumazenil, fentanyl, alfentanil, sufentanil, remifentanil, morphine, hydromorphone, pethidine, oxycodone, naloxone,
dexmedetomidine, clonidine, paracetamol, ketorolac,
suxamethonium, rocuronium, vecuronium, atracurium, cisatracurium, mivacurium, pancuronium, neostigmine,
neostigmine with glycopyrronium, sugammadex, edrophonium, lidocaine, lidocaine with adrenaline, bupivacaine,
bupivacaine with adrenaline, bupivacaine hyperbaric, levobupivacaine, ropivacaine, prilocaine, chloroprocaine, atropine,
glycopyrronium, hyoscine hydrobromide, ondansetron, granisetron, metoclopramide, droperidol, cyclizine, dexamethasone,
prochlorperazine, haloperidol, hydrocortisone, lipid emulsion, dantrolene,
adrenaline, noradrenaline, phenylephrine, ephedrine, metaraminol, vasopressin, terlipressin, dopamine, dobutamine, milrinone,
isoprenaline, levosimendan, glyceryl trinitrate, sodium nitroprusside, labetalol, esmolol, hydralazine, nicardipine, clevidipine,
phentolamine, amiodarone, adenosine, digoxin, verapamil, magnesium sulfate, potassium chloride, calcium chloride,
calcium gluconate, sodium bicarbonate, insulin, heparin, protamine, tranexamic acid, oxytocin, carbetocin, carboprost,
furosemide, aminophylline, salbutamol, levetiracetam, phenytoin, phenobarbital, alprostadil, cefazolin, co-amoxiclav,
vancomycin, gentamicin, teicoplanin, glucose, mannitol`

func TestStarterHoldsTheDrugs(t *testing.T) {
	f := starter(t)
	names := strings.Split(strings.ReplaceAll(wanted, "\n", " "), ", ")
	if len(names) != 109 {
		t.Fatalf("got %d wanted names", len(names))
	}
	for _, n := range names {
		d, _, ok := f.Find(n)
		if !ok || d.Name != n || len(d.Presentations) == 0 {
			t.Errorf("no drug with a presentation is filed under %q", n)
		}
	}
	held := 0
	for _, d := range f.Drugs() {
		if len(d.Presentations) > 0 {
			held++
		}
	}
	if held < 110 {
		t.Errorf("got %d drugs with a presentation, want 110 at least", held)
	}
	if !strings.Contains(f.State(), "not approved") {
		t.Errorf("got the state %q, want it to say that nobody approved it", f.State())
	}
}

// A label prints the name of its style; the two pairs that differ in every
// hospital are held here.
func TestNamesByStyle(t *testing.T) {
	f := starter(t)
	for _, c := range []struct{ name, uk, us string }{
		{"adrenaline", "adrenaline", "epinephrine"}, {"noradrenaline", "noradrenaline", "norepinephrine"},
		{"suxamethonium", "suxamethonium", "succinylcholine"}, {"glyceryl trinitrate", "glyceryl trinitrate", "nitroglycerin"},
	} {
		d, _, _ := f.Find(c.name)
		if d.LabelName(quantity.UK()) != c.uk || d.LabelName(quantity.US()) != c.us {
			t.Errorf("%s: got %s and %s", c.name, d.LabelName(quantity.UK()), d.LabelName(quantity.US()))
		}
		if found, _, ok := f.Find(strings.ToUpper(c.us)); !ok || found.Name != d.Name {
			t.Errorf("%q does not find %s", c.us, d.Name)
		}
	}
	if d, _, _ := f.Find("noradrenaline"); !d.ShowAs || d.CountedAs != "base" {
		t.Errorf("noradrenaline must say that it is counted as base: got %q, shown %v", d.CountedAs, d.ShowAs)
	}
}

// An identifier says what is in the container: its amount and its volume.
func TestIdentifiersAgreeWithContents(t *testing.T) {
	inside := regexp.MustCompile(`^(?:multi-dose )?(ampoule|vial|syringe|bag|bottle) ([0-9.]+ [a-z]+)(?: with [0-9.]+ [a-z]+)?(?: in ([0-9.]+ mL))?(?:, [a-z -]+| \([a-z ]+\))?$`)
	for _, d := range starter(t).Drugs() {
		ids := map[string]bool{}
		for _, p := range d.Presentations {
			m := inside.FindStringSubmatch(p.ID)
			if m == nil || ids[p.ID] {
				t.Errorf("%s: got the identifier %q, want container, amount and volume, once", d.Name, p.ID)
				continue
			}
			ids[p.ID] = true
			a, err := quantity.ParseAmount(m[2])
			if err != nil || !a.Equal(p.Amount) || m[1] != p.Container {
				t.Errorf("%s: %q holds %s in a %s", d.Name, p.ID, quantity.UK().Amount(p.Amount), p.Container)
			}
			if p.Powder() != (m[3] == "") {
				t.Errorf("%s: %q: a powder names no volume, a solution does", d.Name, p.ID)
			}
			if v, err := quantity.ParseVolume(m[3]); m[3] != "" && (err != nil || v.Cmp(p.Volume) != 0) {
				t.Errorf("%s: %q holds %s", d.Name, p.ID, quantity.UK().Volume(p.Volume))
			}
		}
		if (len(d.Presentations) == 0) != slices.Contains(namesOnly, d.Name) {
			t.Errorf("%s: got %d presentations; those in %q have none, all others some", d.Name, len(d.Presentations), namesOnly)
		}
	}
}

// A pair stands once, whichever drug leads, and is allowed or forbidden, not both:
// of two sources for one pair the second would never be read.
func TestPairsStandOnce(t *testing.T) {
	f := starter(t)
	seen := map[[2]string]string{}
	sorted := func(d [2]string) [2]string {
		if d[0] > d[1] {
			return [2]string{d[1], d[0]}
		}
		return d
	}
	for _, n := range f.Never {
		if other, ok := seen[sorted(n.Drugs)]; ok {
			t.Errorf("%v: forbidden in %s and in %s", n.Drugs, other, n.Pos.File)
		}
		seen[sorted(n.Drugs)] = n.Pos.File
	}
	for _, m := range f.Mixes {
		if other, ok := seen[sorted(m.Drugs)]; ok {
			t.Errorf("%v: allowed in %s and forbidden in %s", m.Drugs, m.Pos.File, other)
		}
	}
	if len(seen) < 140 {
		t.Errorf("got %d forbidden pairs", len(seen))
	}
}

// A standard preparation lies inside the bounds of infusions into its line,
// and some presentation can make it.
func TestStandardsInsideBounds(t *testing.T) {
	n := 0
	for _, d := range starter(t).Drugs() {
		for _, s := range d.Standards {
			n++
			c, err := s.Amount.In(s.Volume)
			if err != nil {
				t.Fatal(err)
			}
			inside := false
			for _, b := range d.Bounds {
				if b.Use != "infusion" || b.Line != "any" && b.Line != s.Line {
					continue
				}
				low, err1 := c.Cmp(b.Low.Value)
				high, err2 := c.Cmp(b.High.Value)
				inside = inside || err1 == nil && err2 == nil && low >= 0 && high <= 0
			}
			if !inside {
				t.Errorf("%s: the standard %q is outside every bound for a %s line", d.Name, s.ID, s.Line)
			}
			if s.Source.Title == "" || s.Jurisdiction == "" {
				t.Errorf("%s: the standard %q has no source or no jurisdiction", d.Name, s.ID)
			}
		}
	}
	if n < 15 {
		t.Errorf("got %d standards, want those of the published lists", n)
	}
}

// Every figure has a source that is spelled out; a weak one is marked.
func TestEveryFigureHasASource(t *testing.T) {
	for _, d := range starter(t).Drugs() {
		check := func(what string, given bool, s formulary.Source, unverified bool) {
			if given && (s.Title == "" || !strings.Contains("ABCP", s.Grade) || s.Grade == "C" && !unverified) {
				t.Errorf("%s, %s: got source %+v, unverified %v", d.Name, what, s, unverified)
			}
		}
		for _, p := range d.Presentations {
			check(p.ID, true, p.Source, p.Unverified)
			check(p.ID+" assay", p.Assay.Given(), p.Assay.Source, p.Assay.Unverified)
			check(p.ID+" displacement", p.Displacement.Given(), p.Displacement.Source, p.Displacement.Unverified)
			for _, x := range append(p.Diluents, p.Forbidden...) {
				check(p.ID+" "+x.Name, true, x.Source, x.Unverified)
			}
		}
		for _, b := range d.Bounds {
			check("bounds "+b.Use, true, b.Low.Source, b.Low.Unverified)
			check("bounds "+b.Use, true, b.High.Source, b.High.Unverified)
		}
		for _, r := range d.Doses {
			for _, f := range []formulary.Figure[quantity.Dose]{r.HardLow, r.UsualLow, r.UsualHigh, r.SoftHigh, r.HardHigh} {
				check(r.For+" "+f.Text, f.Given(), f.Source, f.Unverified)
			}
			check(r.For+" total", r.TotalMax.Given(), r.TotalMax.Source, r.TotalMax.Unverified)
		}
		for _, r := range d.Rates {
			for _, f := range []formulary.Figure[quantity.DoseRate]{r.HardLow, r.UsualLow, r.UsualHigh, r.SoftHigh, r.HardHigh} {
				check(r.For+" "+f.Text, f.Given(), f.Source, f.Unverified)
			}
		}
		for _, s := range d.Stability {
			check("stability "+s.Diluent, true, s.Source, s.Unverified)
		}
	}
}

// Rows of one drug, purpose, route and counting do not overlap in age, those for
// the frail apart: an overlap would let the milder of two rows win.
func TestAgeBandsDoNotOverlap(t *testing.T) {
	for _, d := range starter(t).Drugs() {
		for i, a := range d.Doses {
			for _, b := range d.Doses[:i] {
				if a.For == b.For && a.Frail == b.Frail && share(a.Routes, b.Routes) && overlap(a, b) && a.UsualHigh.Value.Basis() == b.UsualHigh.Value.Basis() {
					t.Errorf("%s, %s: the rows for %q and %q overlap", d.Name, a.For, a.Ages(), b.Ages())
				}
			}
		}
		for i, a := range d.Rates {
			for _, b := range d.Rates[:i] {
				if a.For == b.For && a.Frail == b.Frail && share(a.Routes, b.Routes) && overlap(a, b) && a.UsualHigh.Value.Basis() == b.UsualHigh.Value.Basis() {
					t.Errorf("%s, %s: the rows for %q and %q overlap", d.Name, a.For, a.Ages(), b.Ages())
				}
			}
		}
	}
}

func share(a, b []string) bool {
	return slices.ContainsFunc(a, func(s string) bool { return slices.Contains(b, s) })
}

func overlap[T any](a, b formulary.Rule[T]) bool {
	begins := !b.AgeTo.Given() || !a.AgeFrom.Given() || a.AgeFrom.Less(b.AgeTo)
	ends := !a.AgeTo.Given() || !b.AgeFrom.Given() || b.AgeFrom.Less(a.AgeTo)
	return begins && ends
}

// 1 g of magnesium sulfate heptahydrate, 246.466 g/mol by the IUPAC atomic
// weights of 2021, is 4.057 mmol of magnesium; UK texts print 4 mmol.
func TestMagnesiumFactor(t *testing.T) {
	d, _, _ := starter(t).Find("magnesium sulfate")
	if !d.Substance.Given() {
		t.Fatal("magnesium sulfate has no amount of substance")
	}
	factor, err := d.Substance.Value.PerGram.Share(quantity.AmountOf(big.NewRat(1, 1), quantity.Millimole()))
	if err != nil {
		t.Fatal(err)
	}
	exact := new(big.Rat).Quo(big.NewRat(1000, 1), big.NewRat(246466, 1000))
	off := new(big.Rat).Quo(new(big.Rat).Sub(factor, exact), exact)
	if off.Abs(off).Cmp(big.NewRat(2, 100)) > 0 {
		t.Errorf("got %s mmol/g, want %s within 2 %%", factor.FloatString(4), exact.FloatString(4))
	}
}

// Names of brands cannot be listed here without naming them; what comes with
// them can: marks, company forms, addresses, and words in capitals.
func TestNoBrandsAndNoAddresses(t *testing.T) {
	signs := regexp.MustCompile(`[®™©]|https?:|www\.|\.(com|co\.uk|org|net|de|ie)\b|\b(Ltd|Inc|GmbH|PLC|LLC|AG|SA|BV)\b`)
	texts, err := formulary.DefaultTexts()
	if err != nil {
		t.Fatal(err)
	}
	for _, x := range texts {
		for i, line := range strings.Split(string(x.Data), "\n") {
			if s := signs.FindString(line); s != "" {
				t.Errorf("%s:%d: got %q in %q", x.Name, i+1, s, line)
			}
		}
	}
}

// What a preparer must see: each text is short and says one thing.
func TestCautionsAreShort(t *testing.T) {
	for _, d := range starter(t).Drugs() {
		for _, n := range d.Cautions {
			if len(n.Text) > 220 || strings.TrimSpace(n.Text) != n.Text || n.Text == "" {
				t.Errorf("%s: got a caution of %d letters: %s", d.Name, len(n.Text), fmt.Sprintf("%q", n.Text))
			}
		}
		if d.Class == "SUX" || d.Class == "NMB" {
			if !d.Has("paralysing") || !d.Has("high alert") {
				t.Errorf("%s: a relaxant must be marked paralysing and high alert", d.Name)
			}
		}
	}
}
