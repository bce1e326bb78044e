package tomlfile

import (
	"bytes"
	"fmt"
	"slices"
	"strings"
	"testing"

	"github.com/pelletier/go-toml/v2"

	"drawup/dilution/refusal"
)

type syringe struct {
	Drug string   `toml:"drug"`
	Dose string   `toml:"dose"`
	Tags []string `toml:"tags"`
}

type patient struct {
	ID        string    `toml:"id"`
	Weight    string    `toml:"weight"`
	Estimated bool      `toml:"estimated"`
	Syringes  []syringe `toml:"syringe"`
}

type session struct {
	Place string `toml:"place"`
	Date  any    `toml:"date"`
}

type document struct {
	Session  session            `toml:"session"`
	Patients []patient          `toml:"patient"`
	Sources  map[string]session `toml:"sources"`
}

func known() []string {
	return []string{"session", "session.place", "session.date", "patient", "patient.id", "patient.weight", "patient.estimated",
		"patient.syringe", "patient.syringe.drug", "patient.syringe.dose", "patient.syringe.tags", "sources", "sources.*", "sources.*.place"}
}

const good = "[session]\nplace = \"x\"\ndate = 2026-12-01\n\n[[patient]]\nid = \"A\"\n\n[[patient.syringe]]\ndrug = \"a\"\n\n" +
	"[[patient.syringe]]\ndrug = \"b\"\ntags = [\n  \"p\", # one\n  \"q\",\n]\n\n[[patient]]\nid = \"Bü\"; weight\n"

// Places: line and column are counted by eye in the text. The columns are of
// values, and of names for tables; they count characters, not bytes.
func TestPlaces(t *testing.T) {
	text := "session.place = \"x\"\n" +
		"[[patient]]\n" +
		"id = \"A\"\n" +
		"  [[patient.syringe]]\n" +
		"  drug = 'a'\n" +
		"  [[patient.syringe]]\n" +
		"  tags = [\n" +
		"    \"p\", # one\n" +
		"    \"q\",\n" +
		"  ]\n" +
		"[[patient]]\r\n" +
		"syringe = [{ drug = \"ü\", dose = \"1 mg\" }, { drug = \"c\" }]\r\n" +
		"[sources.\"A.1\"]\n" +
		"place = \"y\"\n"
	var d document
	p, list := Decode("f", []byte(text), &d)
	if len(list) > 0 {
		t.Fatal(list)
	}
	if !p.Whole() || len(d.Patients) != 2 || d.Patients[1].Syringes[0].Dose != "1 mg" || d.Sources["A.1"].Place != "y" {
		t.Errorf("decoded %+v", d)
	}
	for _, c := range []struct {
		path []any
		has  bool
		want string
	}{
		{[]any{"session", "place"}, true, "f:1:17"},
		{[]any{"session", "date"}, false, "f:1:1"},
		{[]any{"patient"}, true, "f:2:3"},
		{[]any{"patient", 0}, true, "f:2:3"},
		{[]any{"patient", 0, "id"}, true, "f:3:6"},
		{[]any{"patient", 0, "syringe", 0, "drug"}, true, "f:5:10"},
		{[]any{"patient", 0, "syringe", 0, "dose"}, false, "f:4:5"},
		{[]any{"patient", 0, "syringe", 1, "tags", 0}, true, "f:8:5"},
		{[]any{"patient", 0, "syringe", 1, "tags", 1}, true, "f:9:5"},
		{[]any{"patient", 0, "syringe", 1, "tags", 2}, false, "f:7:3"},
		{[]any{"patient", 0, "syringe", 2}, false, "f:4:5"},
		{[]any{"patient", 1}, true, "f:11:3"},
		{[]any{"patient", 1, "syringe", 0, "drug"}, true, "f:12:21"},
		{[]any{"patient", 1, "syringe", 0, "dose"}, true, "f:12:33"},
		{[]any{"patient", 1, "syringe", 1, "drug"}, true, "f:12:52"},
		{[]any{"patient", 2, "id"}, false, "f:2:3"},
		{[]any{"sources", "A.1", "place"}, true, "f:14:9"},
		{[]any{"sources", "A", "1"}, false, "f:13:2"},
		{[]any{"nothing"}, false, "f"},
		{[]any{3.5}, false, "f"},
		{nil, false, "f"},
	} {
		if got := p.Of(c.path...).String(); got != c.want || p.Has(c.path...) != c.has {
			t.Errorf("%v: got %s, has %v; want %s, %v", c.path, got, p.Has(c.path...), c.want, c.has)
		}
	}
	var none *Places
	if none.Has("a") || none.Whole() || none.Of("a") != (refusal.Pos{}) {
		t.Error("no places know a place")
	}
}

// A table in single brackets, where several may stand, is number 0.
func TestSingleTableOfAnArray(t *testing.T) {
	var d document
	p, list := Decode("f", []byte("[patient]\nid = 'A'\n[[patient.syringe]]\ndrug = 'a'\n"), &d)
	if len(list) > 0 || len(d.Patients) != 1 || len(d.Patients[0].Syringes) != 1 {
		t.Fatalf("got %+v and %v", d, list)
	}
	if p.Of("patient", 0, "syringe", 0, "drug").Line != 4 || !p.Has("patient", 0, "id") || p.Has("patient", 1) {
		t.Error("the places of a single table are lost")
	}
}

func codes(list refusal.List) []string {
	var out []string
	for _, r := range list {
		out = append(out, fmt.Sprintf("%d %s", r.Pos.Line, r.Code))
	}
	return out
}

// Every fault in one run, each on its line.
func TestDecodeFaults(t *testing.T) {
	for name, c := range map[string]struct {
		text  string
		want  []string
		whole bool
	}{
		"all at once": {"[session]\nplace = 3\nplce = 'x'\n[[patient]]\nid = 1\nweight = 72 kg\nestimated = \"true\"\nid = 'x'\n" +
			"[[patient.syringe]]\ndrug = 'a'\ndrug = 'b'\ntags = ['p', 2]\nfoo = {a = 1, a = 2}\n",
			[]string{"2 value-wrong-type", "3 key-unknown", "5 value-wrong-type", "6 file-syntax", "7 value-wrong-type",
				"8 key-repeated", "11 key-repeated", "12 value-wrong-type", "13 key-repeated"}, true},
		"repeated table":         {"[session]\nplace = 'x'\n[session]\nplace = 'y'\n", []string{"3 key-repeated"}, false},
		"table over a key":       {"session.place = 'x'\n[session]\ndate = 'x'\n", []string{"2 key-repeated"}, false},
		"dotted into a value":    {"[session]\nplace = 'x'\nplace.b = 'y'\n", []string{"3 key-repeated"}, true},
		"list over a table":      {"[patient]\n[[patient]]\n", []string{"2 key-repeated"}, false},
		"table where a text is":  {"[session.place]\nx = 1\n", []string{"1 value-wrong-type"}, false},
		"several where one is":   {"[[session]]\nplace = 'x'\n", []string{"1 value-wrong-type"}, false},
		"text where tables are":  {"patient = 'x'\n", []string{"1 value-wrong-type"}, true},
		"misspelt table":         {"[sesion]\nplace = 'x'\n", []string{"1 key-unknown"}, false},
		"unknown table":          {"[weather]\nsun = 'x'\n[session]\nplace = 2\n", []string{"1 key-unknown", "4 value-wrong-type"}, true},
		"header without its end": {"[session\nplace = 3\n", []string{"1 file-syntax"}, false},
		"colon":                  {"[session]\nplace: \"x\"\n", []string{"2 file-syntax"}, true},
		"word processor":         {"[session]\nplace = “x”\n", []string{"2 file-syntax"}, true},
		"no value":               {"[session]\nplace =\ndate = 'x'\n", []string{"2 file-syntax"}, true},
		"quote left open":        {"[session]\nplace = \"x\ndate = 'x'\n", []string{"2 file-syntax"}, true},
		"text left open":         {"[session]\nplace = \"\"\"x\n", []string{"2 file-syntax"}, true},
		"text open to the end":   {"[session]\nplace = \"\"\"x\n\n", []string{"3 file-syntax"}, false},
		"nothing to blame":       {"x = [\n\n", []string{"2 file-syntax"}, false},
		"control character":      {"[session]\nplace = \"a\x00b\"\n", []string{"2 file-syntax"}, true},
		"dates that are none": {"[session]\ndate = 2027-02-29\n[sources.a]\ndate = 25:00:00\n[sources.b]\ndate = 2027-02-30T10:00:00Z\nplace = 2027-02-31\n[sources.c]\ndate = 2028-02-29\nplace = 2028-02-29\n",
			[]string{"2 time-malformed", "4 time-malformed", "6 time-malformed", "7 time-malformed", "10 value-wrong-type"}, true},
		"letter case":     {"[session]\nPlace = 'x'\n[[Patient]]\nid = 'A'\nID = 'B'\n", []string{"2 key-unknown", "3 key-unknown", "5 key-repeated", "5 key-unknown"}, true},
		"a line of words": {"hello there\n", []string{"1 file-syntax"}, false},
	} {
		t.Run(name, func(t *testing.T) {
			var d document
			p, list := Decode("f", []byte(c.text), &d, known()...)
			if got := codes(list); !slices.Equal(got, c.want) || p.Whole() != c.whole {
				t.Errorf("got %q, whole %v; want %q, %v\n%v", got, p.Whole(), c.want, c.whole, list)
			}
			for _, r := range list {
				if r.Message == "" || r.Got == "" || r.Want == "" || r.Remedy == "" || r.Severity != refusal.Refuse {
					t.Errorf("a reason lacks a part: %+v", r)
				}
			}
		})
	}
}

// The remedy names the key or line that was probably meant.
func TestRemedies(t *testing.T) {
	for text, want := range map[string]string{
		"[session]\nplcae = 'x'":                "write \"place\", if that is meant",
		"[[patient]]\nwieght = '72 kg'":         "write \"weight\", if that is meant",
		"[[patient]]\nWeight = '72 kg'":         "write \"weight\", if that is meant",
		"[[patient.syringe]]\nweight = '72 kg'": "move it: the key is \"patient.weight\"",
		"[sources.A]\nplac = 'x'":               "write \"place\", if that is meant",
		"[session]\ncolour = 'x'":               "take the line out",
		"[[patient]]\nweight = 72 kg # scales":  "write: weight = \"72 kg\"",
		"[[patient]]\nweight: '72 kg'":          "write: weight = \"72 kg\"",
		"[[patient]]\nweight = “72 kg”":         "write: weight = \"72 kg\"",
		"[[patient]]\nweight = 72":              "write it in quotes and with its unit: weight = \"72 …\"",
		"[[patient]]\nestimated = 'true'":       "write: estimated = true",
		"[[patient]]\nestimated = 'perhaps'":    "write true or false without quotes",
	} {
		var d document
		_, list := Decode("f", []byte(text), &d, known()...)
		if len(list) != 1 || list[0].Remedy != want {
			t.Errorf("%q: got %+v, want the remedy %q", text, list, want)
		}
	}
}

// A date that the calendar does not have (2027 is no leap year) is called so.
func TestDateThatDoesNotExist(t *testing.T) {
	for text, want := range map[string]string{
		"date = 2027-02-29":           `the value of "date" is a date that does not exist`,
		"date = 2027-04-31":           `the value of "date" is a date that does not exist`,
		"date = 07:61:00":             `the value of "date" is a date or time that does not exist`,
		"date = 2027-02-29T07:30:00Z": `the value of "date" is a date or time that does not exist`,
	} {
		var d document
		_, list := Decode("f", []byte("[session]\n"+text+"\n"), &d, known()...)
		if len(list) != 1 || list[0].Message != want || list[0].Code != refusal.TimeMalformed || !strings.Contains(list[0].Remedy, "exists") || list[0].Pos.Line != 2 {
			t.Errorf("%q: got %+v, want %s", text, list, want)
		}
	}
}

// A text or list that is not closed is found far below; the message says where
// it begins.
func TestWhereItBegins(t *testing.T) {
	var d document
	_, list := Decode("f", []byte("[session]\nplace = 'x'\n\n# a remark\n[[patient]]\nid = \"\"\"A\n\n[[patient]]\n"), &d)
	if len(list) != 1 || !strings.Contains(list[0].Message, "it begins on line 6") {
		t.Errorf("got %v, want one reason that names line 6", list)
	}
}

// A key that is misspelt or does not read is there; it is not missing as well.
func TestHasWhatIsMeant(t *testing.T) {
	var d document
	p, _ := Decode("f", []byte("[[patient]]\nwieght = '72 kg'\nid = A\n[[patient.syringe]]\ndose = 2\n"), &d, known()...)
	for _, path := range [][]any{{"patient", 0, "weight"}, {"patient", 0, "id"}, {"patient", 0, "syringe", 0, "dose"}} {
		if !p.Has(path...) {
			t.Errorf("%v is called missing", path)
		}
	}
	if p.Of("patient", 0, "weight").Line != 2 || p.Of("patient", 0, "id").Line != 3 {
		t.Error("the place of a key with a fault is lost")
	}
}

// Many faults end in a bounded list.
func TestFaultsAreBounded(t *testing.T) {
	for _, line := range []string{"x%d = 'y'\n", "x = 'y'\n", "y%d = z\n"} {
		var text strings.Builder
		for i := range 500 {
			if strings.Contains(line, "%d") {
				fmt.Fprintf(&text, line, i)
			} else {
				text.WriteString(line)
			}
		}
		var d document
		if _, list := Decode("f", []byte(text.String()), &d); len(list) == 0 || len(list) > 2*maxFaults {
			t.Errorf("%q 500 times: got %d reasons", line, len(list))
		}
	}
}

// Distances by the definition of optimal string alignment, counted by hand.
func TestDistance(t *testing.T) {
	for _, c := range []struct {
		a, b string
		want int
	}{{"", "", 0}, {"a", "", 1}, {"dose", "dose", 0}, {"dsoe", "dose", 1}, {"does", "dose", 1}, {"dosee", "dose", 1}, {"rose", "dose", 1}, {"kitten", "sitting", 3}} {
		if got := distance(c.a, c.b); got != c.want {
			t.Errorf("%q to %q: got %d, want %d", c.a, c.b, got, c.want)
		}
	}
}

// Against the library's own strict reading: what it accepts is accepted, with
// the same values; what it refuses is refused. Nothing panics.
func FuzzDecode(f *testing.F) {
	f.Add([]byte(good))
	f.Add([]byte("[session]\nplace = 'x'\n[[patient]]\nid='A'\nsyringe=[{drug='a', tags=['x']}]\n[sources.a]\nplace='b'\n"))
	f.Add([]byte("session.place = 3\nsession = {place = 'x', place = 'y'}\n[a.b]\n[a]\n[[a.b.c]]\n"))
	f.Add([]byte("x = \"\"\"\n1\n\"\"\"\ny = [[[]]]\n'' = 1"))
	f.Fuzz(func(t *testing.T, data []byte) {
		var ours, theirs document
		places, list := Decode("f", data, &ours, known()...)
		if places == nil {
			t.Fatal("no places")
		}
		text, unreadable := checkText("f", data)
		if unreadable.Refused() {
			return
		}
		err := toml.NewDecoder(bytes.NewReader(text)).DisallowUnknownFields().Decode(&theirs)
		// Two keys that differ in letter case only fill one field: the library
		// takes the last, we refuse both spellings.
		if twice := list.Refused() && !slices.ContainsFunc(list, func(r refusal.Reason) bool {
			return r.Code != refusal.KeyRepeated && r.Code != refusal.KeyUnknown
		}); err == nil && twice && strings.ToLower(string(text)) != string(text) {
			return
		}
		if (err != nil) != list.Refused() {
			t.Fatalf("the library says %v, we say %v", err, list)
		}
		if err == nil && fmt.Sprintf("%+v", ours) != fmt.Sprintf("%+v", theirs) {
			t.Fatalf("got %+v, want %+v", ours, theirs)
		}
		for _, r := range list {
			if r.Pos.File != "f" || r.Pos.Line > bytes.Count(text, []byte("\n"))+1 || r.Message == "" || r.Remedy == "" {
				t.Errorf("a reason lacks a part or its place: %+v", r)
			}
		}
	})
}
