package refusal

import (
	"go/ast"
	"go/parser"
	"go/token"
	"regexp"
	"strconv"
	"strings"
	"testing"
)

// constants reads the names and texts of codes.go itself, so that a constant
// without an entry cannot hide.
func constants(t *testing.T) map[string]Code {
	t.Helper()
	file, err := parser.ParseFile(token.NewFileSet(), "codes.go", nil, 0)
	if err != nil {
		t.Fatal(err)
	}
	out := map[string]Code{}
	for _, d := range file.Decls {
		g, ok := d.(*ast.GenDecl)
		if !ok || g.Tok != token.CONST {
			continue
		}
		for _, s := range g.Specs {
			v := s.(*ast.ValueSpec)
			if len(v.Names) != 1 || len(v.Values) != 1 {
				t.Fatalf("%v: want one name and one text a line", v.Names)
			}
			text, err := strconv.Unquote(v.Values[0].(*ast.BasicLit).Value)
			if err != nil {
				t.Fatal(err)
			}
			out[v.Names[0].Name] = Code(text)
		}
	}
	return out
}

func TestCatalogueAndConstantsAgree(t *testing.T) {
	all := constants(t)
	if len(all) < 80 {
		t.Fatalf("got %d constants in codes.go, want the whole file read", len(all))
	}
	owner := map[Code]string{}
	for name, code := range all {
		if other, ok := owner[code]; ok {
			t.Errorf("%s and %s are both %q", name, other, code)
		}
		owner[code] = name
		if _, ok := Lookup(code); !ok {
			t.Errorf("the catalogue has no entry for %s, %q", name, code)
		}
	}
	seen := map[Code]bool{}
	for _, e := range All() {
		if seen[e.Code] {
			t.Errorf("%q stands twice in the catalogue", e.Code)
		}
		seen[e.Code] = true
		if owner[e.Code] == "" {
			t.Errorf("%q is in the catalogue but is no constant", e.Code)
		}
	}
}

// Codes are words for people: kebab-case, two to six plain words.
func TestCodeNames(t *testing.T) {
	kebab := regexp.MustCompile(`^[a-z]+(-[a-z]+){1,5}$`)
	for _, e := range All() {
		if !kebab.MatchString(string(e.Code)) {
			t.Errorf("%q is not two to six lower-case words with hyphens", e.Code)
		}
		for _, word := range strings.Split(string(e.Code), "-") {
			switch word {
			case "error", "invalid", "bad", "err", "fail", "failed":
				t.Errorf("%q says %q, which tells nobody what is wrong", e.Code, word)
			}
		}
	}
}

func TestEntriesAreWhole(t *testing.T) {
	rule := regexp.MustCompile(`^R([1-9]|1[0-9])$`)
	families := map[Family]bool{Quantities: true, Requests: true, Files: true, Patients: true, Choices: true,
		Limits: true, Measuring: true, Times: true, Papers: true, Barcodes: true, Routes: true}
	used := map[Family]bool{}
	for _, e := range All() {
		if !strings.HasSuffix(e.Says, ".") || strings.Count(e.Says, ". ") > 0 || len(e.Says) < 20 || len(e.Says) > 120 {
			t.Errorf("%s: got %q, want one sentence of 20 to 120 letters", e.Code, e.Says)
		}
		if e.Rule != "" && !rule.MatchString(e.Rule) {
			t.Errorf("%s: got rule %q, want R1 to R19 or none", e.Code, e.Rule)
		}
		if !families[e.Family] {
			t.Errorf("%s: the family %q is not one of the eleven", e.Code, e.Family)
		}
		used[e.Family] = true
		if e.Refuses != e.May(Refuse) || e.Cautions != e.May(Caution) || !e.Refuses && !e.Cautions || e.May(0) {
			t.Errorf("%s: it must refuse or caution, and say so", e.Code)
		}
	}
	if len(used) != len(families) {
		t.Errorf("got entries in %d families, want all %d", len(used), len(families))
	}
}

func TestLookupOfNoCode(t *testing.T) {
	if e, ok := Lookup("no-such-code"); ok || e.Code != "" {
		t.Errorf("got %+v, want nothing", e)
	}
}

func TestSeverityWords(t *testing.T) {
	for s, want := range map[Severity]string{Refuse: "refused", Caution: "caution", 0: "severity not set", 9: "severity not set"} {
		if got := s.String(); got != want {
			t.Errorf("Severity(%d): got %q, want %q", s, got, want)
		}
	}
}

// A reason without a severity stops the work: nothing passes by a slip of ours.
func TestUnsetSeverityRefuses(t *testing.T) {
	l := List{{Code: DrugUnknown}}
	if !l.Refused() || len(l.Refusals()) != 1 || len(l.Cautions()) != 0 {
		t.Errorf("a reason without a severity must refuse")
	}
}

func TestListSortsByPlaceThenSyringe(t *testing.T) {
	l := List{
		{Code: "c", Pos: Pos{Line: 9, Column: 1}}, {Code: "b", Pos: Pos{Line: 3, Column: 7}, Syringe: 2},
		{Code: "d", Pos: Pos{Line: 3, Column: 7}, Syringe: 1}, {Code: "a", Pos: Pos{Line: 3, Column: 2}},
	}
	l.Sort()
	var got []string
	for _, r := range l {
		got = append(got, string(r.Code))
	}
	if s := strings.Join(got, ""); s != "adbc" {
		t.Errorf("got %s, want adbc", s)
	}
	if codes := l.Codes(); len(codes) != 4 || codes[0] != "a" || codes[3] != "d" {
		t.Errorf("got %v, want the four codes in order", codes)
	}
	if of := l.Of(2); len(of) != 1 || of[0].Code != "b" {
		t.Errorf("got %v of syringe 2, want b", of)
	}
}

func TestReasonAsError(t *testing.T) {
	r := Reason{Code: DrugUnknown, Message: "x is unknown", Pos: Pos{File: "a.toml", Line: 3, Column: 4}}
	if got := r.Error(); got != "a.toml:3:4: drug-unknown: x is unknown" {
		t.Errorf("got %q", got)
	}
	for p, want := range map[Pos]string{{}: "", {File: "a"}: "a", {File: "a", Line: 2}: "a:2", {File: "a", Line: 2, Column: 5}: "a:2:5"} {
		if got := p.String(); got != want {
			t.Errorf("got %q, want %q", got, want)
		}
	}
}
