package main

import (
	"bytes"
	"fmt"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"
	"time"

	"drawup/dilution"
	"drawup/dilution/formulary"
	"drawup/dilution/order"
	"drawup/dilution/recheck"
	"drawup/dilution/refusal"
	"drawup/labels"
	"drawup/layouts"
)

// Every code of the catalogue has an example that is run for real: in the
// marked files of testdata/refused, which the tests of order, dilution and
// formulary read line by line, or in the table below.
func TestEveryCodeHasAnExample(t *testing.T) {
	marked := markedCodes(t)
	run := examples()
	for _, e := range refusal.All() {
		example, ok := run[e.Code]
		switch {
		case ok && marked[e.Code]:
			t.Errorf("%s has an example in testdata/refused; the one here is not needed", e.Code)
		case ok:
			t.Run(string(e.Code), func(t *testing.T) {
				if told := example(t); !regexp.MustCompile(`(^|[^a-z-])` + string(e.Code) + `([^a-z-]|$)`).MatchString(told) {
					t.Errorf("got no %s in\n%s", e.Code, told)
				}
			})
		case !marked[e.Code]:
			t.Errorf("%s has no example anywhere", e.Code)
		}
	}
	for code := range run {
		if _, ok := refusal.Lookup(code); !ok {
			t.Errorf("%s has an example and is not in the catalogue", code)
		}
	}
}

// markedCodes are the codes that files of testdata/refused expect.
func markedCodes(t *testing.T) map[refusal.Code]bool {
	t.Helper()
	files, err := filepath.Glob("../../testdata/refused/*/*.toml")
	if err != nil || len(files) < 40 {
		t.Fatalf("got %d files of refused orders (%v)", len(files), err)
	}
	mark := regexp.MustCompile(`# (?:want|caution)(?: file)?: (.*)`)
	out := map[refusal.Code]bool{}
	for _, file := range files {
		data, err := os.ReadFile(file)
		if err != nil {
			t.Fatal(err)
		}
		for _, m := range mark.FindAllStringSubmatch(string(data), -1) {
			for _, code := range strings.Split(m[1], ",") {
				out[refusal.Code(strings.TrimSpace(code))] = true
			}
		}
	}
	return out
}

// An order of one syringe, for what is refused outside the plan itself.
const soundOrder = `[session]
place = "theatre 2"
date = "2026-12-01"
prepared = "07:30"
preparer = "A. Example"
invented = true

[[patient]]
id = "A"
sex = "female"
age = "40 years"
height = "168 cm"
weight = "70 kg"

[[patient.syringe]]
drug = "suxamethonium"
presentation = "ampoule 100 mg in 2 mL"
dose = "1 mg/kg"
`

// examples is how each remaining code comes about. Each returns what was told.
func examples() map[refusal.Code]func(*testing.T) string {
	two := soundOrder + "\n[[patient.syringe]]\ndrug = \"ondansetron\"\npresentation = \"vial 4 mg in 2 mL\"\ndose = \"4 mg\"\n"
	infusion := strings.Replace(soundOrder, "[[patient.syringe]]\ndrug = \"suxamethonium\"\npresentation = \"ampoule 100 mg in 2 mL\"\ndose = \"1 mg/kg\"\n",
		"[[patient.infusion]]\ndrug = \"labetalol\"\npresentation = \"ampoule 100 mg in 20 mL\"\nmix = \"50 mg in 50 mL\"\ndiluent = \"glucose 5 %\"\nstart = \"1 mg/min\"\n", 1)
	return map[refusal.Code]func(*testing.T) string{
		refusal.FileUnreadable:   preparing("", "absent.toml"),
		refusal.FileEmpty:        preparing(" \n", "order.toml"),
		refusal.FileNotText:      preparing("place = \"\xff\"\n", "order.toml"),
		refusal.FileTooLarge:     preparing(strings.Repeat("# a long comment\n", 1<<16), "order.toml"),
		refusal.SyringesMany:     preparing(soundOrder+strings.Repeat("\n[[patient.syringe]]\ndrug = \"suxamethonium\"\npresentation = \"ampoule 100 mg in 2 mL\"\ndose = \"1 mg/kg\"\n", 999), "order.toml"),
		refusal.FlagMissing:      told("rate", "--dose", "1 mg/h"),
		refusal.FlagUnknown:      told("rate", "--nonsense", "x"),
		refusal.FlagConflict:     told("rate", "--dose", "1 mg/h", "--rate", "1 mL/h", "--mix", "4 mg in 50 mL"),
		refusal.QuickCheck:       told("dose", "--dose", "4 mg", "--concentration", "2 mg/mL", "--drug", "ondansetron", "--age", "40 years"),
		refusal.SurfaceMissing:   told("rate", "--dose", "1 mg/m2/h", "--mix", "4 mg in 50 mL"),
		refusal.RateAbovePump:    told("rate", "--dose", "100 mg/min", "--mix", "100 mg in 100 mL"),
		refusal.StockUnknown:     preparing(soundOrder, "order.toml", "--stock", "papyrus"),
		refusal.SyringeNumber:    preparing(soundOrder, "order.toml", "--leave-out", "9"),
		refusal.SyringesLeftOut:  preparing(two, "order.toml", "--leave-out", "2"),
		refusal.LabelEdition:     preparing(strings.Replace(soundOrder, "\n[[patient]]", "\n[site]\nedition = \"2008\"\n\n[[patient]]", 1), "order.toml", "--json"),
		refusal.LabelsTogether:   preparing(two, "order.toml"),
		refusal.OutputUnwritable: preparing(soundOrder, "order.toml", "--out", "order.toml"),
		refusal.GlyphMissing:     preparing(strings.Replace(soundOrder, "A. Example", "A. 薬", 1), "order.toml"),
		refusal.LabelTooSmall:    preparing(infusion, "order.toml", "--infusion-stock", "roll-40x15"),
		refusal.LabelMoved:       preparing(strings.Replace(soundOrder, "suxamethonium\"\npresentation = \"ampoule 100 mg in 2 mL\"\ndose = \"1 mg/kg", "neostigmine with glycopyrronium\"\npresentation = \"ampoule 2.5 mg with 0.5 mg in 1 mL\"\ndose = \"2.5 mg", 1), "order.toml", "--stock", "roll-40x15"),
		refusal.OneWeightOnly:    told("mix", "--each", "1 microgram/kg/min", "--weight", "6 kg", "--rule", "three"),
		refusal.PairNever:        told("formulary", "pair", "propofol", "with", "remifentanil"),
		refusal.PairNotListed:    told("formulary", "pair", "propofol", "with", "heparin"),
		refusal.ApprovedOther:    approved("base 9", "2026-12-01"),
		refusal.ApprovalPast:     approved("", "2019-12-01"),
		refusal.RoutesDisagree:   unproven,
		refusal.CodeEmpty:        told("read", ""),
		refusal.CodeForeign:      told("read", "hello"),
		refusal.CodeIdentifier:   told("read", "041234"),
		refusal.CodeLength:       told("read", "(01)123"),
		refusal.CodeSign:         told("read", "(91)a b"),
		refusal.CodeCheckDigit:   told("read", "(01)09521234000007"),
		refusal.CodeMoment:       told("read", "(01)09521234000006(17)271301"),
		refusal.CodePairing:      told("read", "(17)271231"),
		refusal.CodeRepeated:     told("read", "(91)a(91)b"),
		refusal.CodeContent:      told("read", "(91)W7"),
		refusal.CodeSeparator:    told("read", "91N01AX0792261201193000001003932mg/mL"),
		refusal.CodeRunTogether:  told("read", "010952123400000610ABC1217271231"),
		refusal.CodePast:         told("read", "(91)N01AX07(92)261201193000001003(93)2mg/mL", "--at", "2026-12-02 07:00"),
		refusal.CodeDrug:         told("read", "(01)09521234000006"),
		refusal.CodeFormulary:    told("read", "(91)N01AX07(92)261201193000001003(93)2mg/mL(94)20mg(95)00000000"),
		refusal.RateBelowHard:    belowHardLimit,
		refusal.SearchCut:        seventyStrengths,
	}
}

// approved prepares an order with an approval of the starter: for another
// version where one is named, with a day of review.
func approved(version, review string) func(*testing.T) string {
	return func(t *testing.T) string {
		f, err := formulary.Default()
		if err != nil {
			t.Fatal(err)
		}
		if version == "" {
			version = f.Version
		}
		text := fmt.Sprintf("formulary = %q\nversion = %q\ndigest = %q\ndate = \"2018-12-01\"\nreview = %q\n", f.Name, version, f.Digest, review) +
			"[[signer]]\nname = \"A. Example\"\nrole = \"pharmacist\"\n[[signer]]\nname = \"B. Example\"\nrole = \"anaesthetist\"\n"
		path := filepath.Join(t.TempDir(), "approval.toml")
		if err := os.WriteFile(path, []byte(text), 0o600); err != nil {
			t.Fatal(err)
		}
		return preparing(soundOrder, "order.toml", "--approval", path)(t)
	}
}

// told runs the command and returns everything that it says.
func told(args ...string) func(*testing.T) string {
	return func(t *testing.T) string {
		var out, faults bytes.Buffer
		run(args, strings.NewReader(""), &out, &faults)
		return out.String() + faults.String()
	}
}

// preparing runs "prepare" on a file in a folder of its own. Arguments that are
// the name of that file are taken for its path.
func preparing(text, name string, args ...string) func(*testing.T) string {
	return func(t *testing.T) string {
		dir := t.TempDir()
		path := filepath.Join(dir, name)
		if text != "" {
			if err := os.WriteFile(path, []byte(text), 0o600); err != nil {
				t.Fatal(err)
			}
		}
		line := []string{"prepare", path, "--out", filepath.Join(dir, "out")}
		for _, a := range args {
			if a == name {
				a = path
			}
			line = append(line, a)
		}
		return told(line...)(t)
	}
}

// unproven hands a label to the page before the second route has passed it.
func unproven(t *testing.T) string {
	o, faults := order.Read("order.toml", []byte(soundOrder))
	f, err := formulary.Default()
	if err != nil {
		t.Fatal(err)
	}
	list, reasons := dilution.NewList(o, f, o.Session.Prepared.Value, nil, faults)
	if reasons.Refused() {
		t.Fatal(reasons)
	}
	l, err := labels.FromPlan(list.Plans[0], labels.FactsOf(list.Plans[0]), makingOf(o, f, o.Session.Prepared.Value, []byte(soundOrder), nil))
	if err != nil {
		t.Fatal(err)
	}
	_, refused := layouts.Labels([]labels.Label{l}, layouts.Stocks()[0], []recheck.Passed{{}}, layouts.Options{})
	return refused.Error()
}

// seventyStrengths plans from a shelf with more strengths of an invented drug than
// are looked at.
func seventyStrengths(t *testing.T) string {
	form := "name = \"invented\"\nversion = \"1\"\n[sources.X]\ntitle = \"invented for a test\"\ngrade = \"A\"\njurisdiction = \"international\"\n" +
		"[[drug]]\nname = \"sleepwell\"\natc = \"N01AX99\"\nclass = \"IND\"\ncounted = \"mass\"\n"
	shelf := "[[barrel]]\nsize = \"50 mL\"\n"
	for mg := range 70 {
		id := fmt.Sprintf("ampoule %d mg in 1 mL", mg+1)
		form += fmt.Sprintf("[[drug.presentation]]\nid = %q\ncontainer = \"ampoule\"\nform = \"solution\"\namount = \"%d mg\"\nvolume = \"1 mL\"\nsource = \"X\"\nuses = [\"bolus\"]\nneat = true\n", id, mg+1)
		shelf += fmt.Sprintf("[[stock]]\ndrug = \"sleepwell\"\npresentation = %q\n", id)
	}
	f, faults := formulary.Read(formulary.Text{Name: "invented.toml", Data: []byte(form)})
	s, more := order.ReadShelf("shelf.toml", []byte(shelf))
	if faults.Refused() || more.Refused() {
		t.Fatal(faults, more)
	}
	o, faults := order.Read("order.toml", []byte(strings.Replace(soundOrder, "drug = \"suxamethonium\"\npresentation = \"ampoule 100 mg in 2 mL\"\ndose = \"1 mg/kg\"", "drug = \"sleepwell\"\namount = \"20 mg\"", 1)))
	_, reasons := dilution.Bench{Shelf: &s}.NewList(o, f, time.Date(2026, 12, 1, 7, 30, 0, 0, time.UTC), nil, faults)
	return reasons.Error()
}

// belowHardLimit orders less than the lowest dose rate of an invented drug; no
// row of the starter formulary stores such a figure.
func belowHardLimit(t *testing.T) string {
	const invented = `name = "invented"
version = "1"
[sources.X]
title = "invented for a test"
grade = "A"
[[drug]]
name = "sleepwell"
atc = "N01AX99"
class = "IND"
counted = "mass"
  [[drug.presentation]]
  id = "ampoule 50 mg in 50 mL"
  container = "ampoule"
  form = "solution"
  amount = "50 mg"
  volume = "50 mL"
  source = "X"
  uses = ["infusion"]
  neat = true
  [[drug.concentration]]
  use = "infusion"
  line = "any"
  low = { value = "1 mg/mL", source = "X" }
  high = { value = "1 mg/mL", source = "X" }
  [[drug.infusion]]
  for = "sedation"
  routes = ["IV"]
  by = "none"
  hard_low = { value = "2 mg/h", source = "X" }
  usual_low = { value = "3 mg/h", source = "X" }
  usual_high = { value = "5 mg/h", source = "X" }
`
	f, faults := formulary.Read(formulary.Text{Name: "invented.toml", Data: []byte(invented)})
	if faults.Refused() {
		t.Fatal(faults)
	}
	text := strings.Replace(soundOrder, "[[patient.syringe]]\ndrug = \"suxamethonium\"\npresentation = \"ampoule 100 mg in 2 mL\"\ndose = \"1 mg/kg\"\n",
		"[[patient.infusion]]\ndrug = \"sleepwell\"\nmix = \"50 mg in 50 mL\"\nstart = \"1 mg/h\"\n", 1)
	o, faults := order.Read("order.toml", []byte(text))
	_, reasons := dilution.NewList(o, f, time.Date(2026, 12, 1, 7, 30, 0, 0, time.UTC), nil, faults)
	return reasons.Refusals().Error()
}
