package dilution_test

import (
	"fmt"
	"os"
	"path/filepath"
	"slices"
	"sort"
	"strings"
	"testing"

	"drawup/dilution"
	"drawup/dilution/formulary"
	"drawup/dilution/order"
	"drawup/dilution/refusal"
)

const refusedFolder = "../testdata/refused/plan"

// marks reads "# want: a, b" and "# caution: c" at the ends of lines, as
// "line: code", sorted; line 0 stands for the whole list.
func marks(text, mark string) []string {
	var out []string
	for i, line := range strings.Split(text, "\n") {
		number := i + 1
		_, codes, ok := strings.Cut(line, "# "+mark+": ")
		if !ok {
			if _, codes, ok = strings.Cut(line, "# "+mark+" file: "); !ok {
				continue
			}
			number = 0
		}
		for _, c := range strings.Split(codes, ",") {
			out = append(out, fmt.Sprintf("%d: %s", number, strings.TrimSpace(c)))
		}
	}
	sort.Strings(out)
	return out
}

func placed(list refusal.List) []string {
	var out []string
	for _, r := range list {
		out = append(out, fmt.Sprintf("%d: %s", r.Pos.Line, r.Code))
	}
	sort.Strings(out)
	return out
}

// refusedTexts are the files of the folder by name.
func refusedTexts(t *testing.T) map[string]string {
	t.Helper()
	files, err := filepath.Glob(refusedFolder + "/*.toml")
	if err != nil || len(files) < 20 {
		t.Fatalf("got %d files in %s, want at least 20 (%v)", len(files), refusedFolder, err)
	}
	out := map[string]string{}
	for _, f := range files {
		data, err := os.ReadFile(f)
		if err != nil {
			t.Fatal(err)
		}
		out[filepath.Base(f)] = string(data)
	}
	return out
}

// formularyFor is the invented formulary beside the file, of the same name and
// the ending "formulary", or the starter.
func formularyFor(t *testing.T, name string, starter *formulary.Formulary) *formulary.Formulary {
	t.Helper()
	file := filepath.Join(refusedFolder, strings.TrimSuffix(name, ".toml")+".formulary")
	data, err := os.ReadFile(file)
	if os.IsNotExist(err) {
		return starter
	}
	if err != nil {
		t.Fatal(err)
	}
	f, faults := formulary.Read(formulary.Text{Name: file, Data: data})
	if faults.Refused() {
		t.Fatal(faults)
	}
	return f
}

// A bench that reads orders from text.
type bench struct{ dilution.Bench }

// plan reads an order from text and plans it from the bench.
func (b bench) plan(t interface{ Helper() }, f *formulary.Formulary, text string) (dilution.List, refusal.List) {
	t.Helper()
	o, faults := order.Read("order.toml", []byte(text))
	return b.NewList(o, f, o.Session.Prepared.Value, nil, faults)
}

// benchFor is the invented shelf beside the file, of the same name and the ending
// "shelf", or no shelf.
func benchFor(t *testing.T, name string) bench {
	t.Helper()
	data, err := os.ReadFile(filepath.Join(refusedFolder, strings.TrimSuffix(name, ".toml")+".shelf"))
	if os.IsNotExist(err) {
		return bench{}
	}
	if err != nil {
		t.Fatal(err)
	}
	s := shelf(t, string(data))
	return bench{dilution.Bench{Shelf: &s}}
}

// Every refusal is expected on its line, and every expected one comes. The
// expected codes stand in the files, written by hand.
func TestRefusedPlans(t *testing.T) {
	f := starter(t)
	for name, text := range refusedTexts(t) {
		t.Run(name, func(t *testing.T) {
			_, list := benchFor(t, name).plan(t, formularyFor(t, name, f), text)
			want, noted := marks(text, "want"), marks(text, "caution")
			if len(want)+len(noted) == 0 {
				t.Error("the file expects nothing")
			}
			if got := placed(list.Refusals()); !slices.Equal(got, want) {
				t.Errorf("got refusals\n%s\nwant\n%s\nreasons\n%v", strings.Join(got, "\n"), strings.Join(want, "\n"), list)
			}
			got := placed(list.Cautions())
			for _, c := range noted {
				if !slices.Contains(got, c) {
					t.Errorf("no caution %q among\n%s", c, strings.Join(got, "\n"))
				}
			}
			for _, r := range list {
				checkReason(t, r)
			}
		})
	}
}

// checkReason demands what every reason must say, and that its code may come
// this way.
func checkReason(t *testing.T, r refusal.Reason) {
	t.Helper()
	if r.Message == "" || strings.HasSuffix(r.Message, ".") || strings.Contains(r.Message, "\n") {
		t.Errorf("%s: the message is not one plain sentence: %q", r.Code, r.Message)
	}
	if r.Field == "" && r.Code != refusal.NothingToMake {
		t.Errorf("%s: the reason names no field: %+v", r.Code, r)
	}
	if r.Severity == refusal.Refuse && r.Remedy == "" {
		t.Errorf("%s: a refusal without a remedy: %q", r.Code, r.Message)
	}
	e, ok := refusal.Lookup(r.Code)
	if !ok || !e.May(r.Severity) {
		t.Errorf("%s came as %v, which the catalogue does not know", r.Code, r.Severity)
	}
}

// A misspelt name is answered with the drugs that it may have meant.
func TestUnknownDrugNamesItsNeighbours(t *testing.T) {
	f := starter(t)
	for typed, meant := range map[string]string{
		"etomidat": "etomidate", "noradrenalin": "noradrenaline", "norepinefrine": "norepinephrine",
		"rocuroniun": "rocuronium", "ketamin": "ketamine", "succinylcholin": "succinylcholine",
	} {
		_, list := plan(t, f, session+adult+"[[patient.syringe]]\n"+lines(key("drug", typed), key("dose", "1 mg")))
		refused := list.Refusals()
		if len(refused) != 1 || refused[0].Code != refusal.DrugUnknown || !strings.Contains(refused[0].Remedy, meant) {
			t.Errorf("%q: got %v, want %q offered", typed, refused, meant)
		}
	}
}

// A list from which every syringe is left out makes nothing, and says so.
func TestEverythingLeftOut(t *testing.T) {
	text := session + adult + "[[patient.syringe]]\n" + lines(key("drug", "suxamethonium"), key("presentation", "ampoule 100 mg in 2 mL"), key("dose", "1 mg/kg"))
	o, faults := order.Read("order.toml", []byte(text))
	list, reasons := dilution.NewList(o, starter(t), o.Session.Prepared.Value, map[int]bool{1: true}, faults)
	if got := reasons.Codes(); !slices.Equal(got, []refusal.Code{refusal.NothingToMake}) || !reasons.Refused() {
		t.Errorf("got %v, want %s alone", got, refusal.NothingToMake)
	}
	if len(list.Plans) != 0 || len(list.LeftOut) != 1 || list.LeftOut[0].Drug != "suxamethonium" {
		t.Errorf("got %d plans and %v left out", len(list.Plans), list.LeftOut)
	}
}

// A refused syringe that is left out no longer stops the rest, and its reasons
// are kept for the sheets.
func TestLeaveOut(t *testing.T) {
	text := session + adult + "[[patient.syringe]]\n" + lines(key("drug", "suxamethonium"), key("presentation", "ampoule 100 mg in 2 mL"), key("dose", "10 mg/kg")) +
		"[[patient.syringe]]\n" + lines(key("drug", "suxamethonium"), key("presentation", "ampoule 100 mg in 2 mL"), key("dose", "1,5 mg/kg")) +
		"[[patient.syringe]]\n" + lines(key("drug", "suxamethonium"), key("presentation", "ampoule 100 mg in 2 mL"), key("dose", "1 mg/kg"))
	o, faults := order.Read("order.toml", []byte(text))
	f := starter(t)
	if _, reasons := dilution.NewList(o, f, o.Session.Prepared.Value, nil, faults); len(reasons.Refusals()) != 2 {
		t.Errorf("got %v, want the reasons of syringes 1 and 2", reasons.Refusals())
	}
	if _, reasons := dilution.NewList(o, f, o.Session.Prepared.Value, map[int]bool{1: true}, faults); len(reasons.Refusals()) != 1 {
		t.Errorf("got %v, want the reason of syringe 2 alone", reasons.Refusals())
	}
	list, reasons := dilution.NewList(o, f, o.Session.Prepared.Value, map[int]bool{1: true, 2: true}, faults)
	if reasons.Refused() || len(list.Plans) != 1 || list.Plans[0].Number != 3 || len(list.LeftOut) != 2 {
		t.Fatalf("got %v and %d plans, want syringe 3 made", reasons.Refusals(), len(list.Plans))
	}
	for i, code := range []refusal.Code{refusal.SlipTen, refusal.NumberWithComma} {
		if got := list.LeftOut[i].Reasons.Refusals().Codes(); !slices.Equal(got, []refusal.Code{code}) {
			t.Errorf("left out %d: got %v, want %s", i+1, got, code)
		}
	}
}
