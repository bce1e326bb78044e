package labels

import (
	"strings"
	"testing"
)

// What parts the editions (public summaries of both, and guidance of 2014 that
// restates the first): the line of relaxant reversal came in 2020. Colours are
// the same.
func TestEditions(t *testing.T) {
	old, ok := SchemeOf("2008", "")
	now, ok2 := SchemeOf("", "")
	if !ok || !ok2 || now.Edition != "2020" || len(old.Classes()) != len(now.Classes()) || len(now.Classes()) != 18 {
		t.Fatalf("got %v %v, %d and %d classes", old.Edition, now.Edition, len(old.Classes()), len(now.Classes()))
	}
	for i, a := range old.Classes() {
		b := now.Classes()[i]
		if a.Code != b.Code || a.Word != b.Word || a.Fill != b.Fill || a.Stripes != b.Stripes || a.Bar != b.Bar {
			t.Errorf("%s: got %+v in 2008 and %+v in 2020, want the same colours, words and stripes", a.Code, a, b)
		}
		if want := b.Code == "NMB-R"; a.Line || b.Line != want {
			t.Errorf("%s: got line %v in 2008, %v in 2020", a.Code, a.Line, b.Line)
		}
		if a.Edition != "2008" || b.Edition != "2020" || a.Basis == "" || a.Why == "" || b.Why == "" {
			t.Errorf("%s: got no edition, basis or reason: %+v, %+v", a.Code, a, b)
		}
	}
	for _, bad := range [][2]string{{"2010", ""}, {"2020", "green"}} {
		if s, ok := SchemeOf(bad[0], bad[1]); ok || len(s.Classes()) > 0 {
			t.Errorf("got a scheme %v", bad)
		}
	}
	if _, ok := old.Class("SEDATIVE"); ok {
		t.Error("got a class of no code")
	}
}

// What was not seen in the standard is marked as a reading, and nothing claims
// more than the clauses that were read; the package's words and the adhesive
// are never claimed (label rules, part 9).
func TestReadingsAreMarked(t *testing.T) {
	now, _ := SchemeOf("2020", "")
	for _, c := range now.Classes() {
		unseen := c.Bar || c.Code == "HEP" || c.Code == "PRO" || c.Code == "ACO"
		if unseen != (c.Basis == "reading") {
			t.Errorf("%s: got basis %q, want a reading %v", c.Code, c.Basis, unseen)
		}
		if c.Claim() != "layout after ISO 26825:2020, 5.2 to 5.4" {
			t.Errorf("%s claims %q", c.Code, c.Claim())
		}
	}
	old, _ := SchemeOf("2008", "")
	for _, c := range old.Classes() {
		if !strings.HasPrefix(c.Claim(), "layout after ISO 26825:2008") || strings.Contains(c.Claim(), "5.") || strings.Contains(c.Claim(), "2020") {
			t.Errorf("%s claims %q, want no clause of an edition that was not read", c.Code, c.Claim())
		}
	}
}

// The teal of Australia changes anticoagulants and protamine and nothing else.
func TestTeal(t *testing.T) {
	for _, edition := range Editions() {
		plain, _ := SchemeOf(edition, "")
		regional, ok := SchemeOf(edition, "teal")
		if !ok {
			t.Fatal("there is no teal")
		}
		for i, c := range regional.Classes() {
			was := plain.Classes()[i]
			changed := c.Code == "HEP" || c.Code == "ACO" || c.Code == "PRO"
			if (c.Fill != was.Fill) != changed || c.Word != was.Word || c.Stripes != was.Stripes || c.Region != "teal" {
				t.Errorf("%s %s: got %+v, was %+v", edition, c.Code, c, was)
			}
			if changed && c.Fill != teal {
				t.Errorf("%s: got %v, want teal", c.Code, c.Fill)
			}
		}
	}
}

// Labels of two schemes are refused together.
func TestOneScheme(t *testing.T) {
	of := func(edition, region string) Label {
		s, _ := SchemeOf(edition, region)
		c, _ := s.Class("OPI")
		return Label{Class: c}
	}
	for _, x := range []struct {
		list []Label
		ok   bool
	}{
		{nil, true}, {[]Label{of("2020", ""), of("2020", "")}, true}, {[]Label{of("2008", ""), of("2008", "")}, true},
		{[]Label{of("2020", ""), of("2008", "")}, false}, {[]Label{of("2020", ""), of("2020", "teal")}, false},
	} {
		if got := OneScheme(x.list); (len(got) == 0) != x.ok {
			t.Errorf("got %v, want accepted %v", got, x.ok)
		}
	}
}

// A row that lacks a part is no class.
func TestFaultyTables(t *testing.T) {
	const head = "scheme,code,parent,word,fill,design,basis,why\n"
	for text, want := range map[string]string{
		"2020,X,,XS,white,plain,reading,because\n":                               "",
		"2020,X,,XS,pink,plain,reading,because\n":                                "colour",
		"2020,X,,XS,white,dots,reading,because\n":                                "design",
		"2020,X,,XS,white,plain,guess,because\n":                                 "basis",
		"2020,X,,XS,white,plain,reading,\n":                                      "reason",
		"2020,X,,,white,plain,reading,because\n":                                 "word",
		"2020,X,,XS,white,plain,reading,b\n2020,X,,XS,white,plain,reading,b\n":   "once",
		"2020,X,,XS,white,plain\n":                                               "fields",
		"2020,X,,XS,white,plain,reading,because\n2008,X,,XS,red,bar,clause,so\n": "",
	} {
		rows, err := readClasses(head + text)
		if want == "" && (err != nil || len(rows) == 0) || want != "" && (err == nil || !strings.Contains(err.Error(), want)) {
			t.Errorf("%q: got %v, %v, want %q", text, rows, err, want)
		}
	}
}
