package labels_test

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"drawup/dilution/recheck"
	"drawup/dilution/refusal"
	"drawup/labels"
)

// The rows are those of a public summary of Table 1 of ISO 26825:2020; the
// colours are the published screen values of the inks it names, typed anew.
// Process yellow, heparin, protamine, anticoagulants and the rest group have no
// source.
func TestClassTable(t *testing.T) {
	const table = `
IND   FFED00 - - -
BZD   FF8200 - - -
BZD-A FF8200 stripes - -
NMB   F9423A - - -
SUX   F9423A - bar -
NMB-R F9423A stripes - line
OPI   71C5E8 - - -
OPI-A 71C5E8 stripes - -
VAS   D6BFDD - - -
ADR   D6BFDD - bar -
HYP   D6BFDD stripes - -
LA    AFA9A0 - - -
ACH   A4D65E - - -
AEM   EFBE7D - - -
HEP   FFFFFF - - -
PRO   000000 stripes - -
ACO   FFFFFF - - -
OTH   FFFFFF - - -`
	want := strings.Split(strings.TrimSpace(table), "\n")
	if len(labels.Classes()) != len(want) {
		t.Fatalf("got %d classes, want %d", len(labels.Classes()), len(want))
	}
	for i, row := range want {
		f := strings.Fields(row)
		c, ok := labels.ClassOf(f[0])
		if !ok || labels.Classes()[i] != c {
			t.Errorf("no class %s in its place", f[0])
			continue
		}
		if got := fmt.Sprintf("%02X%02X%02X", c.Fill.R, c.Fill.G, c.Fill.B); got != f[1] {
			t.Errorf("%s: got fill %s, want %s", c.Code, got, f[1])
		}
		if c.Stripes != (f[2] == "stripes") || c.Bar != (f[3] == "bar") || c.Line != (f[4] == "line") {
			t.Errorf("%s: got stripes %v, bar %v, line %v, want %s", c.Code, c.Stripes, c.Bar, c.Line, row)
		}
		if c.Word == "" || c.Word != strings.ToUpper(c.Word) {
			t.Errorf("%s: got class word %q, want one in capitals", c.Code, c.Word)
		}
		if c.Parent != "" {
			if p, ok := labels.ClassOf(c.Parent); !ok || p.Fill != c.Fill && c.Code != "PRO" {
				t.Errorf("%s: got parent %q of another colour", c.Code, c.Parent)
			}
		}
	}
	for _, code := range []string{"", "ind", "SEDATIVE"} {
		if c, ok := labels.ClassOf(code); ok {
			t.Errorf("%q: got class %v, want none", code, c)
		}
	}
}

// luminance is the relative luminance of WCAG 2.1.
func luminance(c labels.RGB) float64 {
	part := func(v uint8) float64 {
		x := float64(v) / 255
		if x <= 0.04045 {
			return x / 12.92
		}
		return math.Pow((x+0.055)/1.055, 2.4)
	}
	return 0.2126*part(c.R) + 0.7152*part(c.G) + 0.0722*part(c.B)
}

func contrast(a, b labels.RGB) float64 {
	x, y := luminance(a), luminance(b)
	if x < y {
		x, y = y, x
	}
	return (x + 0.05) / (y + 0.05)
}

// A reader without the red receptor sees black on warm red with less than
// 4.5 to 1 (matrix for protanopes after Viénot, Brettel and Mollon 1999, on
// linear sRGB), and on no other colour: those classes are the dim ones.
func TestDim(t *testing.T) {
	protan := sights()[1]
	for _, c := range labels.Classes() {
		v := protan.sees(linear(c.Background()))
		y := 0.2126*v[0] + 0.7152*v[1] + 0.0722*v[2]
		if dim := (y+0.05)/0.05 < 4.5; dim != c.Dim() {
			t.Errorf("%s: got contrast %.2f for a protanope, Dim %v", c.Code, (y+0.05)/0.05, c.Dim())
		}
	}
}

func example() labels.Label {
	opi, _ := labels.ClassOf("OPI")
	return labels.Label{
		Number: 3, Class: opi, Name: "Fentanyl",
		Concentration: labels.Cell{Text: "50 micrograms/mL", Figure: recheck.Concentration},
		Amount:        labels.Line{{Text: "500 micrograms", Figure: recheck.AmountInSyringe}, {Text: " in "}, {Text: "10 mL", Figure: recheck.FinalVolume}},
		UseBy:         labels.Line{{Text: "use by "}, {Text: "01 Dec 2026 19:30", Figure: recheck.UseBy}},
		Codes:         []labels.Cell{{Text: "(91)N01AH01(94)1mg", Figure: "code.1.text"}, {Text: "(91)N01AH01", Figure: "code.2.text"}},
		Marks:         []string{labels.MarkStarter},
	}
}

func TestFiguresAndText(t *testing.T) {
	l := example()
	l.Digest = "70836235"
	want := []recheck.Figure{
		{Paper: "label", Name: "concentration", Text: "50 micrograms/mL"}, {Paper: "label", Name: "amount", Text: "500 micrograms"},
		{Paper: "label", Name: "final.volume", Text: "10 mL"}, {Paper: "label", Name: "use.by", Text: "01 Dec 2026 19:30"},
		{Paper: "label", Name: "ref", Text: "70836235"},
		{Paper: "label", Name: "code.1.text", Text: "(91)N01AH01(94)1mg"}, {Paper: "label", Name: "code.2.text", Text: "(91)N01AH01"},
	}
	got := l.Figures("label")
	if fmt.Sprint(got) != fmt.Sprint(want) {
		t.Errorf("got %v, want %v", got, want)
	}
	text := "Fentanyl|50 micrograms/mL|500 micrograms in 10 mL|use by 01 Dec 2026 19:30|unapproved data|OPIOID|70836235|(91)N01AH01(94)1mg|(91)N01AH01"
	if got := strings.Join(l.Text(), "|"); got != text {
		t.Errorf("got %q, want %q", got, text)
	}
}

// What a label must have: name, concentration per mL and use-by (R15), and on
// an infusion also amount, diluent, route and time (field set of hospital
// rules for infusion labels).
func TestCheckLacks(t *testing.T) {
	for _, c := range []struct {
		spoil func(*labels.Label)
		lacks string
	}{
		{func(l *labels.Label) {}, ""},
		{func(l *labels.Label) { l.Class = labels.Class{} }, "class"},
		{func(l *labels.Label) { l.Name = "" }, "drug name"},
		{func(l *labels.Label) { l.Concentration = labels.Cell{} }, "concentration"},
		{func(l *labels.Label) { l.Concentration.Figure = "" }, "concentration"},
		{func(l *labels.Label) { l.UseBy = labels.Words("use by tonight") }, "use-by"},
		{func(l *labels.Label) { l.Second = "Lidocaine" }, "concentration of the second drug"},
		{func(l *labels.Label) { l.Infusion = true }, "diluent, route, time of preparation"},
	} {
		l := example()
		c.spoil(&l)
		var lacks []string
		for _, r := range l.Check() {
			if r.Severity != refusal.Refuse || r.Syringe != 3 {
				t.Errorf("got %+v, want a refusal of syringe 3", r)
			}
			lacks = append(lacks, r.Field)
		}
		if got := strings.Join(lacks, ", "); got != c.lacks {
			t.Errorf("got %q lacking, want %q", got, c.lacks)
		}
	}
}

// ISO 26825:2020, 5.4.2: initial capital and small letters, or a mixed-case
// form as it stands; never capitals throughout. cHLORPROMAZIne is the listed
// form with the most capitals (79 %).
func TestNameCase(t *testing.T) {
	for name, ok := range map[string]bool{
		"Fentanyl": true, "fentaNYL": true, "ePHEDrine": true, "DOBUTamine": true, "cHLORPROMAZIne": true, "Glyceryl trinitrate": true,
		"芬太尼": true, "FENTANYL": false, "fentanyl": false, "MORPHIN": false, " Fentanyl": false,
	} {
		l := example()
		l.Name = name
		if got := len(l.Check()) == 0; got != ok {
			t.Errorf("%q: got accepted %v, want %v", name, got, ok)
		}
	}
	l := example()
	l.Second, l.SecondConcentration = "glycopyrronium", labels.Cell{Text: "1 mg/mL", Figure: recheck.SecondConcentrated}
	if got := l.Check(); got != nil {
		t.Errorf("got %v for a second name in small letters, want nothing", got)
	}
}
