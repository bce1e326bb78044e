package order

import (
	"errors"
	"math/big"
	"strings"
	"testing"
	"time"

	"drawup/dilution/body"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"

	"github.com/pelletier/go-toml/v2"

	"drawup/dilution/tomlfile"
)

// whole uses every key once; the data are invented.
const whole = `# an order that can be made
[session]
place = "theatre 2"
date = 2026-12-01
prepared = "07:30"
zone = "Europe/Berlin"
preparer = "A. Example"
invented = true

[site]
style = "uk"
bolus_use_by = "4 h"
infusion_use_by = "1 day"
smallest_volume = "0.1 mL"
tolerance = "5 %"
pump_step = "0.1 mL/h"
barrels = ["1 mL", "2.5 mL", "50 mL"]

[[patient]]
id = "A"
name = "Nobody"
sex = "woman"
age = "82 years"
height = "1.58 m"
weight = "54 kg"
weighed = 2026-11-30
estimated = true

[[patient.syringe]]
drug = "etomidate"
presentation = "ampoule 20 mg in 10 mL"
indication = "induction"
dose = "0.3 mg/kg by lean body weight"
concentration = "2 mg/mL"
volume = "10 mL"
diluent = "sodium chloride 0.9 %"
route = "IV"
size = "10 mL"
batch = "B1"
expiry = "2027-03"
accepted_by = "B. Example"
accepted_reason = "because"

[[patient.infusion]]
drug = "noradrenaline"
mix = "4 mg in 50 mL"
method = "add to"
line = "central"
start = "0.05 microgram/kg/min"
from = "0.02 microgram/kg/min"
to = "0.3 microgram/kg/min"
expiry = "2027-03-15"

[[patient.syringe]]
drug = "magnesium sulfate"
amount = "8 mmol"
volume = "20 mL"

[[patient]]
id = "B"

[[patient.syringe]]
drug = "ondansetron"
dose = "4 mg"

[[site.gtin]]
number = "9521234000006"
drug = "etomidate"
concentration = "2 mg/mL"
volume = "10 mL"
`

func mustRead(t *testing.T, text string) Order {
	t.Helper()
	o, list := Read("ward.toml", []byte(text))
	if len(list) > 0 {
		t.Fatalf("got %v, want no reason", list)
	}
	return o
}

// The values below are read off the text above by eye.
func TestWholeOrder(t *testing.T) {
	o := mustRead(t, whole)
	if got := o.Session.Prepared.Value.Format(time.RFC3339); got != "2026-12-01T07:30:00+01:00" {
		t.Errorf("prepared: got %s, want half past seven in Berlin, one hour before UTC", got)
	}
	if !o.Session.Invented || o.Session.Zone.Value != "Europe/Berlin" || o.Session.Preparer.Value != "A. Example" {
		t.Errorf("session: got %+v", o.Session)
	}
	if o.Site.BolusUseBy.Value != 4*time.Hour || o.Site.InfusionUseBy.Value != 24*time.Hour {
		t.Errorf("use-by: got %v and %v, want 4 h and 24 h", o.Site.BolusUseBy.Value, o.Site.InfusionUseBy.Value)
	}
	if len(o.Site.Barrels) != 3 || o.Site.Barrels[1].Value.Exact() != "2.5" || o.Site.Tolerance.Value.Exact() != "5" || o.Site.PumpStep.Value.Exact() != "0.1" || o.Site.Smallest.Value.Exact() != "0.1" {
		t.Errorf("site: got %+v", o.Site)
	}
	// 952 is the GS1 prefix for demonstrations and examples.
	if g := o.Site.Products; len(g) != 1 || g[0].Number.Value != "09521234000006" || g[0].Drug.Value != "etomidate" || g[0].Concentration.Value.Exact(quantity.Milligram()) != "2" || g[0].Volume.Value.Exact() != "10" {
		t.Errorf("GTIN: got %+v", g)
	}
	p := o.Patients[0]
	if p.Sex.Value != body.Female || p.Age.Value.Years() != 82 || p.Height.Value.Exact() != "158" || p.Weight.Value.Exact() != "54" || p.Weighed.Value != "2026-11-30" || !p.Estimated {
		t.Errorf("patient: got %+v", p)
	}
	s := o.Syringes[0]
	if s.Dose.Value.Exact() != "0.3" || s.Dose.Value.Basis() != quantity.PerKilogram || s.DoseBy.Value != body.Lean || s.DoseBy.Text != "lean" {
		t.Errorf("dose: got %+v by %+v", s.Dose, s.DoseBy)
	}
	if got := s.Expiry.Value.Format(time.RFC3339); got != "2027-03-31T23:59:00+02:00" {
		t.Errorf("a month's expiry: got %s, want the last minute of March", got)
	}
	i := o.Syringes[2]
	if !i.Infusion || i.Method.Value != AddTo || i.MixAmount.Value.Exact(quantity.Milligram()) != "4" || i.MixVolume.Value.Exact() != "50" {
		t.Errorf("infusion: got %+v", i)
	}
	if got := i.Expiry.Value.Format(time.RFC3339); got != "2027-03-15T23:59:00+01:00" {
		t.Errorf("a day's expiry: got %s, want the last minute of that day", got)
	}
	if i.RateBy.Given() || i.Standard.Given() || i.Dose.Given() {
		t.Error("what is not in the file is given")
	}
}

// Making order: patient by patient, syringes before infusions, each as the
// file has them.
func TestMakingOrder(t *testing.T) {
	o := mustRead(t, whole)
	want := []struct {
		drug    string
		patient int
		line    int
	}{{"etomidate", 0, 29}, {"magnesium sulfate", 0, 54}, {"noradrenaline", 0, 44}, {"ondansetron", 1, 62}}
	for n, w := range want {
		s := o.Syringes[n]
		if s.Number != n+1 || s.Drug.Value != w.drug || s.Patient != w.patient || s.Pos.Line != w.line || s.Pos.File != "ward.toml" {
			t.Errorf("syringe %d: got %d %s of patient %d at %v, want %s of %d at line %d", n+1, s.Number, s.Drug.Value, s.Patient, s.Pos, w.drug, w.patient, w.line)
		}
	}
	if pos := o.Syringes[0].Dose.Pos; pos.Line != 33 || pos.Column != 8 {
		t.Errorf("dose: got %v, want line 33, column 8", pos)
	}
	if pos := o.Site.Barrels[1].Pos; pos.Line != 17 || pos.Column != 20 {
		t.Errorf("second barrel: got %v, want line 17, column 20", pos)
	}
}

// A fault inside a syringe carries its number, whatever found it; a fault
// elsewhere carries none.
func TestFaultsCarryTheirSyringe(t *testing.T) {
	text := strings.NewReplacer(
		`amount = "8 mmol"`, "amount = 8",
		`mix = "4 mg in 50 mL"`, `mix = "4 mg in 50,0 mL"`,
		`route = "IV"`, `rout = "IV"`,
		`weight = "54 kg"`, `weight = "54 lb"`,
		`dose = "4 mg"`, `dose = 4 mg`,
	).Replace(whole)
	_, list := Read("ward.toml", []byte(text))
	want := map[refusal.Code]int{refusal.ValueWrongType: 2, refusal.NumberWithComma: 3, refusal.KeyUnknown: 1, refusal.UnitWrongKind: 0, refusal.FileSyntax: 4}
	if len(list) != len(want) {
		t.Fatalf("got %d reasons, want %d:\n%v", len(list), len(want), list)
	}
	for _, r := range list {
		if n, ok := want[r.Code]; !ok || n != r.Syringe {
			t.Errorf("%v: got syringe %d, want %d", r, r.Syringe, n)
		}
	}
}

// A zone is named or counted from UTC; nothing is taken from the machine.
func TestZones(t *testing.T) {
	for _, c := range []struct{ zone, clock, want string }{
		{``, "07:30", "2026-07-01T07:30:00Z"},
		{`zone = "UTC"`, "07:30", "2026-07-01T07:30:00Z"},
		{`zone = "+05:30"`, "07:30", "2026-07-01T07:30:00+05:30"},
		{`zone = "-03:00"`, "00:00", "2026-07-01T00:00:00-03:00"},
		{`zone = "Europe/Berlin"`, "23:59", "2026-07-01T23:59:00+02:00"},
	} {
		text := "[session]\nplace='x'\ndate='2026-07-01'\nprepared='" + c.clock + "'\npreparer='y'\n" + c.zone + "\n[[patient]]\nid='A'\n[[patient.syringe]]\ndrug='ondansetron'\ndose='4 mg'\n"
		if got := mustRead(t, text).Session.Prepared.Value.Format(time.RFC3339); got != c.want {
			t.Errorf("%s: got %s, want %s", c.zone, got, c.want)
		}
	}
}

// Clock changes: European Union, directive 2000/84/EC (last Sundays of March
// and October at 01:00 UTC); Lord Howe Island, half an hour, IANA time zone
// database, from 11:00 to 10:30 before UTC at 02:00 on the first Sunday in April.
func TestClockChanges(t *testing.T) {
	for _, c := range []struct {
		zone, date, clock string
		fine              bool
	}{
		{"Europe/Berlin", "2026-03-29", "01:59", true},
		{"Europe/Berlin", "2026-03-29", "02:00", false},
		{"Europe/Berlin", "2026-03-29", "02:59", false},
		{"Europe/Berlin", "2026-03-29", "03:00", true},
		{"Europe/Berlin", "2026-10-25", "01:59", true},
		{"Europe/Berlin", "2026-10-25", "02:00", false},
		{"Europe/Berlin", "2026-10-25", "02:59", false},
		{"Europe/Berlin", "2026-10-25", "03:00", true},
		{"Australia/Lord_Howe", "2026-04-05", "01:29", true},
		{"Australia/Lord_Howe", "2026-04-05", "01:30", false},
		{"Australia/Lord_Howe", "2026-04-05", "01:59", false},
		{"Australia/Lord_Howe", "2026-04-05", "02:00", true},
		{"+01:00", "2026-10-25", "02:30", true},
	} {
		text := "[session]\nplace='x'\ndate='" + c.date + "'\nprepared='" + c.clock + "'\npreparer='y'\nzone='" + c.zone + "'\n[[patient]]\nid='A'\n[[patient.syringe]]\ndrug='ondansetron'\ndose='4 mg'\n"
		o, list := Read("x", []byte(text))
		if fine := !list.Refused(); fine != c.fine || fine && o.Session.Prepared.Value.Format("15:04") != c.clock {
			t.Errorf("%s %s in %s: got %v, want fine %v", c.date, c.clock, c.zone, list, c.fine)
		}
	}
}

// Weight by age of Advanced Paediatric Life Support, 2011, at its published
// check points and the ends of its bands, worked by hand.
func TestWeightByAge(t *testing.T) {
	for _, c := range []struct {
		age        string
		num, den   int64
		firstMonth bool
	}{
		{"1 month", 9, 2, false}, {"6 months", 7, 1, false}, {"11 months", 19, 2, false},
		{"1 year", 10, 1, false}, {"18 months", 10, 1, false}, {"5 years", 18, 1, false},
		{"6 years", 25, 1, false}, {"12 years", 43, 1, false}, {"3 weeks", 9, 2, true}, {"0 days", 9, 2, true},
	} {
		age, err := body.ParseAge(c.age)
		if err != nil {
			t.Fatal(err)
		}
		got, first := weightByAge(age)
		if got.Cmp(big.NewRat(c.num, c.den)) != 0 || first != c.firstMonth {
			t.Errorf("%s: got %s kg, first month %v", c.age, got.FloatString(2), first)
		}
	}
}

// The edges of the nets: the last value that passes and the first that does
// not, worked by hand from the rule.
func TestNets(t *testing.T) {
	for _, c := range []struct {
		body string
		want refusal.Code
	}{
		{`weight="0.3 kg"`, ""}, {`weight="0.29 kg"`, refusal.WeightImplausible},
		{`weight="400 kg"`, ""}, {`weight="400.1 kg"`, refusal.WeightImplausible},
		{`height="25 cm"`, ""}, {`height="24.9 cm"`, refusal.HeightImplausible},
		{`height="2.5 m"`, ""}, {`height="2.51 m"`, refusal.HeightImplausible},
		{"age=\"6 years\"\nweight=\"50 kg\"", ""}, {"age=\"6 years\"\nweight=\"75.1 kg\"", refusal.BodyValuesStrange},
		{"age=\"1 month\"\nweight=\"2.25 kg\"", ""}, {"age=\"1 month\"\nweight=\"1.49 kg\"", refusal.BodyValuesStrange},
		{"age=\"3 weeks\"\nweight=\"0.6 kg\"", ""},
		{"age=\"13 years\"\nweight=\"25 kg\"", ""}, {"age=\"13 years\"\nweight=\"24.9 kg\"", refusal.BodyValuesStrange},
		{"age=\"44 years\"\nweight=\"350 kg\"", ""}, {"age=\"44 years\"\nweight=\"350.1 kg\"", refusal.BodyValuesStrange},
		{"age=\"44 years\"\nweight=\"40 kg\"\nheight=\"200 cm\"", ""}, {"age=\"44 years\"\nweight=\"39.9 kg\"\nheight=\"200 cm\"", refusal.BodyValuesStrange},
		{"age=\"3 years\"\nweight=\"41 kg\"\nheight=\"97 cm\"", refusal.BodyValuesStrange},
		{"age=\"6 years\"\nweight=\"35 kg\"\nheight=\"100 cm\"", ""}, {"age=\"6 years\"\nweight=\"35.1 kg\"\nheight=\"100 cm\"", refusal.BodyValuesStrange},
		{"age=\"6 years\"\nweight=\"20.25 kg\"\nheight=\"150 cm\"", ""}, {"age=\"6 years\"\nweight=\"20.24 kg\"\nheight=\"150 cm\"", refusal.BodyValuesStrange},
		{"age=\"12 years\"\nweight=\"35.1 kg\"\nheight=\"100 cm\"", refusal.BodyValuesStrange}, {"age=\"13 years\"\nweight=\"35.1 kg\"\nheight=\"100 cm\"", ""},
		{"age=\"3 weeks\"\nweight=\"0.6 kg\"\nheight=\"30 cm\"", ""}, {"age=\"3 weeks\"\nweight=\"3.5 kg\"\nheight=\"31 cm\"", refusal.BodyValuesStrange},
		{"weight=\"90 kg\"\nheight=\"100 cm\"", ""}, {"weight=\"90.1 kg\"\nheight=\"100 cm\"", refusal.BodyValuesStrange},
	} {
		text := strings.Replace("[session]\nplace='x'\ndate='2026-07-01'\nprepared='07:30'\npreparer='y'\n[[patient]]\nid='A'\nBODY\n[[patient.syringe]]\ndrug='ondansetron'\ndose='4 mg'\n", "BODY", c.body, 1)
		_, list := Read("x", []byte(text))
		var got refusal.Code
		if len(list) > 0 {
			got = list[0].Code
		}
		if got != c.want || len(list) > 1 {
			t.Errorf("%q: got %v, want %q", c.body, list, c.want)
		}
	}
}

// A child's weight outside half to twice the weight by age of Advanced
// Paediatric Life Support, 2011, gets one caution that concerns the whole order,
// and the order can be made: at 3 years 14 kg, so 7 to 28 kg; at 1 month 4.5 kg,
// so 2.25 to 9 kg; at 12 years 43 kg, so 21.5 to 86 kg. 14 kg are 30.86 lb, by
// 0.45359237 kg to the pound. The net is our own.
func TestFarFromMiddle(t *testing.T) {
	for _, c := range []struct {
		body string
		want bool
	}{
		{"age=\"3 years\"\nweight=\"14 kg\"", false}, {"age=\"3 years\"\nweight=\"14 kg\"\nheight=\"97 cm\"", false},
		{"age=\"3 years\"\nweight=\"30.8 kg\"", true}, {"age=\"3 years\"\nweight=\"30.8 kg\"\nheight=\"97 cm\"", true},
		{"age=\"3 years\"\nweight=\"41 kg\"", true}, {"age=\"3 years\"\nweight=\"42 kg\"", true},
		{"age=\"3 years\"\nweight=\"28 kg\"", false}, {"age=\"3 years\"\nweight=\"28.1 kg\"", true},
		{"age=\"3 years\"\nweight=\"7 kg\"", false}, {"age=\"3 years\"\nweight=\"6.9 kg\"", true},
		{"age=\"1 month\"\nweight=\"2.25 kg\"", false}, {"age=\"1 month\"\nweight=\"2.24 kg\"", true},
		{"age=\"3 weeks\"\nweight=\"0.6 kg\"", false}, {"age=\"3 weeks\"\nweight=\"9 kg\"", false}, {"age=\"3 weeks\"\nweight=\"9.1 kg\"", true},
		{"age=\"12 years\"\nweight=\"86.1 kg\"", true}, {"age=\"13 years\"\nweight=\"86.1 kg\"", false}, {"weight=\"30.8 kg\"", false},
	} {
		o, list := Read("x", []byte("[session]\nplace='x'\ndate='2026-07-01'\nprepared='07:30'\npreparer='y'\n[[patient]]\nid='A'\n"+c.body+"\n[[patient.syringe]]\ndrug='ondansetron'\ndose='4 mg'\n"))
		if list.Refused() || len(o.Syringes) != 1 || !o.Patients[0].Weight.Value.Given() {
			t.Errorf("%q: got %v, want an order that can be made", c.body, list)
		}
		if got := len(list) == 1 && list[0].Code == refusal.WeightImplausible && list[0].Severity == refusal.Caution; got != c.want || len(list) > 1 {
			t.Errorf("%q: got %v, want a caution %v", c.body, list, c.want)
		}
		for _, r := range list {
			checkReason(t, r)
			if line := 9; r.Pos.Line != line {
				t.Errorf("%q: got line %d, want that of the weight, %d", c.body, r.Pos.Line, line)
			}
		}
	}
}

// Spans of the site: from 1 min to 30 days, a bound of our own.
func TestSpans(t *testing.T) {
	for text, want := range map[string]time.Duration{
		"1 min": time.Minute, "90 minutes": 90 * time.Minute, "4h": 4 * time.Hour, "720 h": 720 * time.Hour, "30 days": 720 * time.Hour, "43200 min": 720 * time.Hour,
	} {
		if got, err := parseSpan(text); err != nil || got != want {
			t.Errorf("%q: got %v, %v; want %v", text, got, err, want)
		}
	}
	for _, text := range []string{"0 min", "0 h", "31 days", "721 h", "43201 min", "9999 days", "99999999999999999999 h", "1.5 h", "h", "4", "4 weeks", "-4 h", "04 h"} {
		got, err := parseSpan(text)
		var fault *timeError
		if got != 0 || !errors.As(err, &fault) || fault.want == "" || fault.why == "" {
			t.Errorf("%q: got %v, %v; want a refusal that says why", text, got, err)
		}
	}
}

// 999 syringes can be told apart by three digits, the next one is refused where
// it stands, whether it is a syringe or an infusion.
func TestTooManySyringes(t *testing.T) {
	const head = "[session]\nplace='x'\ndate='2026-07-01'\nprepared='07:30'\npreparer='y'\n[[patient]]\nid='A'\n"
	const one = "[[patient.syringe]]\ndrug='ondansetron'\ndose='4 mg'\n"
	const pump = "[[patient.infusion]]\ndrug='labetalol'\nmix='50 mg in 50 mL'\nstart='1 mg/min'\n"
	if o := mustRead(t, head+strings.Repeat(one, 500)+"[[patient]]\nid='B'\n"+strings.Repeat(one, 499)); len(o.Syringes) != 999 {
		t.Errorf("got %d syringes, want 999", len(o.Syringes))
	}
	for _, c := range []struct {
		text string
		line int
	}{
		{head + strings.Repeat(one, 1000), 7 + 3*999 + 1},
		{head + strings.Repeat(one, 998) + pump + pump, 7 + 3*998 + 4 + 1},
		{head + strings.Repeat(one, 999) + "[[patient]]\nid='B'\n" + pump + one, 7 + 3*999 + 2 + 4 + 1},
	} {
		o, list := Read("x", []byte(c.text))
		if len(list) != 1 || list[0].Code != refusal.SyringesMany || list[0].Pos.Line != c.line || len(o.Syringes) != 0 {
			t.Errorf("got %v and %d syringes, want too-many-syringes on line %d", list, len(o.Syringes), c.line)
			continue
		}
		checkReason(t, list[0])
	}
}

// Combinations of the four keys that are allowed, and those that are not.
func TestCombinations(t *testing.T) {
	lines := map[byte]string{'d': `dose="20 mg"`, 'a': `amount="20 mg"`, 'c': `concentration="2 mg/mL"`, 'v': `volume="10 mL"`}
	want := map[string]refusal.Code{
		"": refusal.KeyMissing, "v": refusal.KeyMissing, "c": refusal.KeyMissing, "dc": refusal.KeyMissing,
		"ac": refusal.KeyConflict, "dac": refusal.KeyConflict, "da": refusal.KeyConflict, "dv": refusal.KeyConflict,
		"d": "", "a": "", "av": "", "cv": "", "dav": "", "dcv": "", "acv": "", "dacv": "",
	}
	if len(want) != 16 {
		t.Fatalf("got %d combinations, want all 16", len(want))
	}
	for keys, code := range want {
		text := "[session]\nplace='x'\ndate='2026-07-01'\nprepared='07:30'\npreparer='y'\n[[patient]]\nid='A'\n[[patient.syringe]]\ndrug='etomidate'\n"
		for i := range len(keys) {
			text += lines[keys[i]] + "\n"
		}
		_, list := Read("x", []byte(text))
		var got refusal.Code
		if len(list) > 0 {
			got = list[0].Code
		}
		if got != code || len(list) > 1 {
			t.Errorf("%q: got %v, want %q", keys, list, code)
		}
	}
}

// The words after a dose in the forms that people write.
func TestWordAfterDose(t *testing.T) {
	for _, c := range []struct {
		text, head, word string
		kind             body.Kind
	}{
		{"0.3 mg/kg lean", "0.3 mg/kg", "lean", body.Lean},
		{"0.3 mg/kg by lean weight", "0.3 mg/kg", "lean", body.Lean},
		{"0.3 mg/kg ideal body weight", "0.3 mg/kg", "ideal", body.Ideal},
		{"0.3 mg per kg total", "0.3 mg per kg", "total", body.Actual},
		{"0.3 mg/kg", "0.3 mg/kg", "", 0},
		{"0.3 mg per kg", "0.3 mg per kg", "", 0},
		{"lean", "lean", "", 0},
		{"weight", "weight", "", 0},
		{"", "", "", 0},
	} {
		if head, word, kind := cutWord(c.text); head != c.head || word != c.word || kind != c.kind {
			t.Errorf("%q: got %q, %q, %v", c.text, head, word, kind)
		}
	}
}

// The list of known keys and the records are the same: what the encoder writes
// of the records is what the list holds.
func TestKnownKeysAreTheRecords(t *testing.T) {
	c := commonRecord{Expiry: ""}
	data, err := toml.Marshal(fileRecord{
		Session:  sessionRecord{Date: "", Prepared: ""},
		Site:     siteRecord{Barrels: []string{}, Products: []productRecord{{}}},
		Patients: []patientRecord{{Weighed: "", Syringes: []syringeRecord{{commonRecord: c, Doses: ""}}, Infusions: []infusionRecord{{commonRecord: c}}}},
	})
	if err != nil {
		t.Fatal(err)
	}
	var file fileRecord
	places, list := tomlfile.Decode("x", data, &file)
	if list.Refused() {
		t.Fatal(list)
	}
	count := 0
	for _, line := range strings.Split(string(data), "\n") {
		if strings.Contains(line, "=") {
			count++
		}
	}
	known := 0
	for _, k := range knownKeys() {
		path := []any{}
		for _, part := range strings.Split(k, ".") {
			path = append(path, part)
			if part == "patient" || part == "syringe" || part == "infusion" || part == "gtin" {
				path = append(path, 0)
			}
		}
		if !places.Has(path...) {
			t.Errorf("the records have no %s", k)
		}
		if strings.Contains(k, ".") && k != "patient.syringe" && k != "patient.infusion" && k != "site.gtin" {
			known++
		}
	}
	if count != known {
		t.Errorf("the records have %d keys, the list %d", count, known)
	}
}
