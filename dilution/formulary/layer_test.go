package formulary_test

import (
	"bytes"
	"fmt"
	"slices"
	"strings"
	"testing"
	"time"

	"drawup/dilution/formulary"
	"drawup/dilution/refusal"
)

// An invented base and an invented site over it.
const baseText = `name = "base"
version = "1"
[sources.I]
title = "an invented document"
grade = "A"
jurisdiction = "UK"
[[drug]]
name = "slumbrium"
also = ["sleepol"]
atc = "N05CD08"
class = "BZD"
counted = "mass"
never_as_infusion = { text = "an invented ban", source = "I" }
  [[drug.presentation]]
  id = "ampoule 10 mg in 2 mL"
  container = "ampoule"
  form = "solution"
  amount = "10 mg"
  volume = "2 mL"
  source = "I"
  uses = ["bolus"]
  neat = true
  [[drug.dose]]
  for = "sedation"
  routes = ["IV"]
  by = "none"
  usual_low = { value = "1 mg", source = "I" }
  usual_high = { value = "2 mg", source = "I" }
  hard_high = { value = "5 mg", source = "I" }
`

// site is the base's drug in a site's file, with one line replaced.
func site(old, new string) string {
	s := strings.Replace(baseText, "name = \"base\"\nversion = \"1\"\n", "name = \"harbour\"\nversion = \"7\"\nbase = \"base 1\"\n", 1)
	return strings.Replace(s, old, new, 1)
}

func readText(t *testing.T, text string) *formulary.Formulary {
	t.Helper()
	f, faults := formulary.Read(formulary.Text{Name: "base.toml", Data: []byte(text)})
	if faults.Refused() {
		t.Fatal(faults)
	}
	return f
}

func layer(t *testing.T, text string) (*formulary.Formulary, refusal.List) {
	t.Helper()
	return formulary.Layer(readText(t, baseText), formulary.Text{Name: "site.toml", Data: []byte(text)})
}

// What a site changes, what it is called, and whether it needs a reason. The
// sentences are what a pharmacist would read aloud.
func TestWhatASiteLoosens(t *testing.T) {
	for _, c := range []struct {
		old, new, says string
		loosened       bool
	}{
		{`hard_high = { value = "5 mg", source = "I" }`, `hard_high = { value = "7 mg", source = "I" }`,
			"slumbrium: dose for sedation, IV: hard maximum raised from 5 mg to 7 mg", true},
		{`hard_high = { value = "5 mg", source = "I" }`, `hard_high = { value = "4 mg", source = "I" }`,
			"slumbrium: dose for sedation, IV: hard maximum lowered from 5 mg to 4 mg", false},
		{`hard_high = { value = "5 mg", source = "I" }`, ``,
			"slumbrium: dose for sedation, IV: hard maximum taken away; it was 5 mg", true},
		{`usual_low = { value = "1 mg", source = "I" }`, `usual_low = { value = "500 microgram", source = "I" }`,
			"slumbrium: dose for sedation, IV: usual lowest lowered from 1 mg to 500 microgram", true},
		{`never_as_infusion = { text = "an invented ban", source = "I" }`, ``,
			"slumbrium: never as infusion taken away; it was an invented ban", true},
		{`amount = "10 mg"`, `amount = "10 mg"` + "\n" + `age_from = "1 year"`,
			"slumbrium: ampoule 10 mg in 2 mL: from age added: 1 year", false},
		{`by = "none"`, `by = "lean"`, "slumbrium: dose for sedation, IV: goes by changed from none to lean", true},
		{`hard_high = { value = "5 mg", source = "I" }`, `hard_high = { value = "5 mg", source = "I", unverified = true }`,
			"slumbrium: dose for sedation, IV: hard maximum: standing changed from not marked to unverified", false},
		{`hard_high = { value = "5 mg", source = "I" }`, `hard_high = { value = "5 mg", source = "I", verified_by = "A. Example, 2026-12-01" }`,
			"slumbrium: dose for sedation, IV: hard maximum: standing changed from not marked to verified by A. Example, 2026-12-01", false},
		{`neat = true`, "neat = true\n  multi_dose = true", "slumbrium: ampoule 10 mg in 2 mL: more than one dose added: allowed", true},
		{`also = ["sleepol"]`, `also = ["sleepol", "dozine"]`, "slumbrium: name dozine added: dozine", false},
	} {
		f, faults := layer(t, site(c.old, c.new))
		got := formulary.Compare(readText(t, baseText), f)
		if len(got) != 1 || got[0].String() != c.says || got[0].Loosened != c.loosened {
			t.Errorf("%q: got %v, want %q, loosened %v", c.new, got, c.says, c.loosened)
		}
		if refused := slices.Contains(faults.Codes(), refusal.LimitLoosened); refused != c.loosened {
			t.Errorf("%q: refused %v, want %v: %v", c.new, refused, c.loosened, faults)
		}
	}
	// Another document for the same figure is told.
	other := site(`hard_high = { value = "5 mg", source = "I" }`, `hard_high = { value = "5 mg", source = "J" }`)
	f, _ := layer(t, strings.Replace(other, "[[drug]]", "[sources.J]\ntitle = \"another document\"\ngrade = \"A\"\njurisdiction = \"UK\"\n[[drug]]", 1))
	want := "[slumbrium: dose for sedation, IV: hard maximum: source changed from an invented document to another document]"
	if got := formulary.Compare(readText(t, baseText), f); fmt.Sprint(got) != want {
		t.Errorf("got %v, want %s", got, want)
	}
	// The same figure in another unit is no change.
	f, _ = layer(t, site(`value = "5 mg"`, `value = "5000 microgram"`))
	if got := formulary.Compare(readText(t, baseText), f); len(got) != 0 {
		t.Errorf("got %v for the same figure in another unit", got)
	}
}

// With a reason in its own keys a loosened figure passes; what is gone needs a
// record of its own.
func TestALoosenedLimitWithReason(t *testing.T) {
	f, faults := layer(t, site(`hard_high = { value = "5 mg", source = "I" }`,
		`hard_high = { value = "7 mg", source = "I", reason = "ventilated adults", verified_by = "A. Example, 2026-12-01" }`))
	if faults.Refused() {
		t.Fatal(faults)
	}
	d, _, _ := f.Find("sleepol")
	if d.From != "harbour 7" || f.Base != "base 1" || f.Digest == readText(t, baseText).Digest || d.Doses[0].HardHigh.VerifiedBy == "" {
		t.Errorf("got the drug from %q over %q", d.From, f.Base)
	}
	gone := site(`  hard_high = { value = "5 mg", source = "I" }`+"\n",
		"  [[drug.taken_away]]\n  limit = \"dose for sedation, IV: hard maximum\"\n  reason = \"age bands come with version 8\"\n  source = \"I\"\n")
	if _, faults := layer(t, gone); faults.Refused() {
		t.Error(faults)
	}
	row := strings.Replace(gone, "IV: hard maximum", "IV", 1) // a whole row at once
	if _, faults := layer(t, row); faults.Refused() {
		t.Error(faults)
	}
}

// One more row of a purpose that has rows may be milder than they are.
func TestAMilderRowBesideAnother(t *testing.T) {
	_, faults := layer(t, site("", "")+`
  [[drug.dose]]
  for = "sedation"
  routes = ["IV"]
  by = "actual"
  usual_high = { value = "1 mg/kg", source = "I" }
`)
	if !slices.Contains(faults.Codes(), refusal.LimitLoosened) {
		t.Errorf("got %v, want the row refused without a reason", faults)
	}
}

// Out and in again, standard preparations are the same, whatever a spreadsheet
// does to the file: a mark at its head, semicolons, other line ends, columns and lines
// with nothing in them.
func TestStandardsThroughATable(t *testing.T) {
	f := starter(t)
	var b bytes.Buffer
	if err := f.WriteStandards(&b); err != nil {
		t.Fatal(err)
	}
	plain := b.String()
	want := standardsOf(f)
	for name, text := range map[string]string{"plain": plain, "marked": "\ufeff" + plain, "line ends": strings.ReplaceAll(plain, "\n", "\r\n"), "semicolons": semicolons(t, plain),
		"blank columns and lines": strings.ReplaceAll(plain, "\n", ",,\n") + ",,,,\n,,\n"} {
		again, faults := formulary.Layer(f, formulary.Text{Name: "standards.csv", Data: []byte(text)})
		if faults.Refused() {
			t.Errorf("%s: %v", name, faults)
			continue
		}
		if got := standardsOf(again); !slices.Equal(got, want) {
			t.Errorf("%s: got\n%s\nwant\n%s", name, strings.Join(got, "\n"), strings.Join(want, "\n"))
		}
		if again.Digest == f.Digest {
			t.Errorf("%s: the digest does not show the table", name)
		}
	}
}

func standardsOf(f *formulary.Formulary) []string {
	var out []string
	for _, d := range f.Drugs() {
		for _, s := range d.Standards {
			out = append(out, fmt.Sprintf("%s|%s|%s|%s|%s|%s|%s|%s|%s|%s|%v", d.Name, s.ID, s.Mix, s.Diluent, s.Line, s.Patients, s.Jurisdiction,
				s.Source.Title, s.Source.Grade, s.Source.Jurisdiction, s.Unverified))
		}
	}
	return out
}

// semicolons parts the fields as spreadsheets do where the comma is a decimal
// sign; fields of the shipped table that hold a comma are quoted there.
func semicolons(t *testing.T, text string) string {
	t.Helper()
	var out strings.Builder
	quoted := false
	for _, r := range text {
		switch {
		case r == '"':
			quoted = !quoted
		case r == ',' && !quoted:
			r = ';'
		}
		out.WriteRune(r)
	}
	return out.String()
}

// A faulty table is refused with the line.
func TestFaultyTables(t *testing.T) {
	const head = "drug,id,mix,diluent,line,patients,jurisdiction,title,grade\n"
	for text, want := range map[string]string{
		"":                      "1: file-syntax",
		"drug,id\n":             "1: key-missing",
		"drug,drug," + head[5:]: "1: key-repeated",
		strings.Replace(head, "grade", "taste", 1):                 "1: key-unknown",
		strings.Replace(head, "diluent,", "", 1):                   "1: key-missing",
		strings.Replace(head, "patients,", "", 1):                  "1: key-missing",
		strings.Replace(head, "grade", ",grade", 1):                "1: key-unknown",
		strings.ReplaceAll(head, ",", "\t"):                        "1: file-syntax",
		head + "moonlight,a,1 mg in 1 mL,,any,,UK,x,A\n":           "2: drug-unknown",
		head + "Noradrenaline,a,1 mg in 1 mL,,any,,UK,x,A\n":       "2: drug-unknown",
		head + "noradrenaline,a,1 unit in 1 mL,,any,,UK,x,A\n":     "2: units-against-mass",
		head + "noradrenaline,a,1 in 1 mL,,any,,UK,x,A\n":          "2: value-unknown",
		head + "noradrenaline,a,\"1,5 mg in 1 mL\",,any,,UK,x,A\n": "2: value-unknown",
		head + "noradrenaline,a,1 mg in 1 mL,,sideways,,UK,x,A\n":  "2: value-unknown",
		head + "noradrenaline,a,1 mg in 1 mL,,any,cats,UK,x,A\n":   "2: value-unknown",
		head + "noradrenaline,a,1 mg in 1 mL,,any,,,x,A\n":         "2: value-unknown",
		head + "noradrenaline,a,1 mg in 1 mL,,any,,Atlantis,x,A\n": "2: value-unknown",
		head + "noradrenaline,a,1 mg in 1 mL,,any,,UK,,A\n":        "2: key-missing",
		head + "noradrenaline,,1 mg in 1 mL,,any,,UK,x,A\n":        "2: key-missing",
		head + "noradrenaline,a,1 mg in 1 mL,,any,,UK,x,A,,more\n": "2: file-syntax",
		head + "noradrenaline,\"a,1 mg in 1 mL,,any,,UK,x,A\n":     "2: file-syntax",
		head + "noradrenaline,a,1 mg in 1 mL,,any,,UK,x,A\n,,,,\n" +
			"noradrenaline,a,2 mg in 1 mL,,any,,UK,x,A\n": "4: key-repeated",
	} {
		_, faults := formulary.Layer(starter(t), formulary.Text{Name: "t.csv", Data: []byte(text)})
		got := ""
		if faults.Refused() {
			got = fmt.Sprintf("%d: %s", faults[0].Pos.Line, faults[0].Code)
		}
		if got != want {
			t.Errorf("%q: got %q, want %q (%v)", text, got, want, faults)
		}
	}
}

// An approval holds for its digest, from its day to the day of review.
func TestApproval(t *testing.T) {
	f := readText(t, baseText)
	text := func(digest, otherwise string) formulary.Text {
		return formulary.Text{Name: "approval.toml", Data: []byte(fmt.Sprintf(`formulary = "base"
version = "1"
digest = "%s"
date = "2026-12-01"
review = "2027-12-01"
otherwise = "%s"
[[signer]]
name = "A. Example"
role = "pharmacist"
[[signer]]
name = "B. Example"
role = "anaesthetist"
`, digest, otherwise))}
	}
	day := func(s string) time.Time {
		d, err := time.Parse("2006-01-02 15:04", s)
		if err != nil {
			t.Fatal(err)
		}
		return d
	}
	other := strings.Repeat("0", 64)
	for _, c := range []struct {
		digest, otherwise, at string
		code                  refusal.Code
		state                 string
	}{
		{f.Digest, "refuse", "2026-12-01 07:30", "", "approved 2026-12-01, version 1, by A. Example (pharmacist) and B. Example (anaesthetist), review 2027-12-01"},
		{f.Digest, "refuse", "2027-12-01 23:59", "", "approved 2026-12-01"},
		{f.Digest, "refuse", "2027-12-02 00:00", refusal.ApprovalPast, ""},
		{f.Digest, "refuse", "2026-11-30 23:59", refusal.ApprovalPast, ""},
		{other, "refuse", "2026-12-02 07:30", refusal.ApprovedOther, ""},
		{other, "not approved", "2026-12-02 07:30", "", "not approved: the approval is for another text"},
		{f.Digest, "not approved", "2028-01-01 07:30", "", "not approved: the approval is past its day of review"},
	} {
		a, faults := formulary.ReadApproval(text(c.digest, c.otherwise))
		if faults.Refused() {
			t.Fatal(faults)
		}
		g, refused := f.Approve(a, day(c.at))
		switch {
		case c.code != "" && !slices.Contains(refused.Codes(), c.code):
			t.Errorf("%+v: got %v", c, refused)
		case c.code == "" && (refused.Refused() || !strings.HasPrefix(g.State(), c.state)):
			t.Errorf("%+v: got the state %q, %v", c, g.State(), refused)
		case c.code == "" && g.Approved() != strings.HasPrefix(c.state, "approved"):
			t.Errorf("%+v: approved is %v", c, g.Approved())
		}
	}
	if f.State() != "not approved" {
		t.Errorf("got the state %q of a formulary that nobody approved", f.State())
	}
}

// The description of the format names every key that the shipped files use.
func TestSchemaNamesEveryKey(t *testing.T) {
	tables, err := formulary.Schema()
	if err != nil {
		t.Fatal(err)
	}
	known := map[string]bool{}
	for _, table := range tables {
		if table.Says == "" || len(table.Fields) == 0 {
			t.Errorf("the table %q says nothing", table.Name)
		}
		for _, f := range table.Fields {
			if f.Key == "" || f.Says == "" || f.Example == "" || f.Kind == "value" {
				t.Errorf("%s: got %+v, want what it is, its kind and an example", table.Name, f)
			}
			known[f.Key] = true
		}
	}
	texts, err := formulary.DefaultTexts()
	if err != nil {
		t.Fatal(err)
	}
	for _, x := range texts {
		for line := range strings.Lines(string(x.Data)) {
			key, _, ok := strings.Cut(strings.TrimSpace(line), " = ")
			if ok && !strings.ContainsAny(key, "#{[\" ") && !known[key] {
				t.Errorf("%s: the key %q is not in the schema", x.Name, key)
			}
		}
	}
}

// Any text: the reader comes to an end, and what it takes can be printed,
// compared with itself and described without a fault.
func FuzzRead(f *testing.F) {
	f.Add(baseText)
	f.Add(site("", ""))
	f.Add("name = \"a\"\nversion = \"1\"\n[[mix]]\ndrugs = [\"a\", \"b\"]\n")
	f.Add("name = \"a\"\n[[drug]]\nname = \"x\"\nsubstitutes = [\"x\"]\n")
	f.Fuzz(func(t *testing.T, text string) {
		got, faults := formulary.Read(formulary.Text{Name: "f.toml", Data: []byte(text)})
		if faults.Refused() {
			return
		}
		if changes := formulary.Compare(got, got); len(changes) != 0 {
			t.Errorf("the formulary differs from itself: %v", changes)
		}
		var b bytes.Buffer
		if err := got.WriteStandards(&b); err != nil {
			t.Error(err)
		}
	})
}

// Any table: the reader comes to an end.
func FuzzTable(f *testing.F) {
	f.Add("drug,id,mix,diluent,line,jurisdiction,title,grade\nslumbrium,a,1 mg in 1 mL,,any,UK,x,A\n")
	base, _ := formulary.Read(formulary.Text{Name: "base.toml", Data: []byte(baseText)})
	f.Fuzz(func(t *testing.T, text string) {
		if _, faults := formulary.Layer(base, formulary.Text{Name: "t.csv", Data: []byte(text)}); faults == nil && text == "" {
			t.Error("an empty table passes")
		}
	})
}
