package main

import (
	"bytes"
	"encoding/json"
	"errors"
	"os"
	"os/exec"
	"reflect"
	"strconv"
	"strings"
	"testing"

	"github.com/rogpeppe/go-internal/testscript"

	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

func TestMain(m *testing.M) {
	testscript.Main(m, map[string]func(){
		"drawup": func() { os.Exit(run(os.Args[1:], os.Stdin, os.Stdout, os.Stderr)) },
	})
}

// TestScripts runs the command as people do. Each script says what it shows.
func TestScripts(t *testing.T) {
	testscript.Run(t, testscript.Params{
		Dir: "../../testdata/script", RequireExplicitExec: true, RequireUniqueNames: true,
		Cmds: map[string]func(*testscript.TestScript, bool, []string){"exec-code": execCode, "serials": serials},
	})
}

// execCode is "exec-code N command args": the command must end with code N.
func execCode(ts *testscript.TestScript, neg bool, args []string) {
	if neg || len(args) < 2 {
		ts.Fatalf("usage: exec-code N command args")
	}
	want, err := strconv.Atoi(args[0])
	ts.Check(err)
	err = ts.Exec(args[1], args[2:]...)
	got := 0
	var exit *exec.ExitError
	if errors.As(err, &exit) {
		got = exit.ExitCode()
	} else if err != nil {
		ts.Fatalf("%v", err)
	}
	if got != want {
		ts.Fatalf("got exit %d, want %d: %s", got, want, ts.ReadFile("stderr"))
	}
}

// serials is "serials a.json b.json": both hold one syringe with one serial.
func serials(ts *testscript.TestScript, neg bool, args []string) {
	if neg || len(args) != 2 {
		ts.Fatalf("usage: serials a.json b.json")
	}
	var found [2]string
	for i, name := range args {
		_, rest, ok := strings.Cut(ts.ReadFile(name), `"serial": "`)
		if !ok {
			ts.Fatalf("%s holds no serial", name)
		}
		found[i], _, _ = strings.Cut(rest, `"`)
	}
	if found[0] != found[1] || found[0] == "" {
		ts.Fatalf("got serials %q and %q, want one", found[0], found[1])
	}
}

// TestExitCodes holds the meaning of the four codes (design: all or nothing).
func TestExitCodes(t *testing.T) {
	reason := func(c refusal.Code, s refusal.Severity) refusal.Reason { return refusal.Reason{Code: c, Severity: s} }
	for _, c := range []struct {
		list refusal.List
		want int
	}{
		{nil, exitMade},
		{refusal.List{reason(refusal.LimitsNotChecked, refusal.Caution)}, exitMade},
		{refusal.List{reason(refusal.FlagMissing, refusal.Caution)}, exitMade},
		{refusal.List{reason(refusal.WeightMissing, refusal.Refuse)}, exitRefused},
		{refusal.List{reason(refusal.NumberMalformed, refusal.Refuse)}, exitRefused},
		{refusal.List{reason(refusal.WeightMissing, refusal.Refuse), reason(refusal.FlagUnknown, refusal.Refuse)}, exitUnreadable},
		{refusal.List{reason(refusal.FileSyntax, refusal.Refuse), reason(refusal.WeightMissing, refusal.Refuse)}, exitUnreadable},
		{refusal.List{reason(refusal.FileSyntax, refusal.Refuse), reason(refusal.RoutesDisagree, refusal.Refuse)}, exitDisagree},
	} {
		if got := exitCode(c.list); got != c.want {
			t.Errorf("%v: got %d, want %d", c.list.Codes(), got, c.want)
		}
	}
}

// TestVoice holds the form in which a refusal is told.
func TestVoice(t *testing.T) {
	var b bytes.Buffer
	speak(&b, refusal.List{
		{Code: refusal.WeightMissing, Severity: refusal.Refuse, Syringe: 3, Message: "no weight", Rule: "R3", Source: "design",
			Remedy: "add it", Pos: refusal.Pos{File: "a.toml", Line: 4, Column: 2}},
		{Code: refusal.LimitsNotChecked, Severity: refusal.Caution, Message: "not told here"},
		{Code: refusal.FlagUnknown, Severity: refusal.Refuse, Message: "escape \x1b[31m and\nline"},
	})
	want := "drawup: refused: weight-missing\n  a.toml:4:2: syringe 3: no weight\n  rule: R3; design\n  do: add it\n" +
		"drawup: refused: flag-unknown\n  escape  [31m and line\n"
	if b.String() != want {
		t.Errorf("got\n%s\nwant\n%s", b.String(), want)
	}
}

// TestFaultCodes holds that every fault of a quantity's text has its code in
// the catalogue of refusals and is a refusal, not an unreadable request.
func TestFaultCodes(t *testing.T) {
	for _, f := range []quantity.Fault{quantity.EmptyText, quantity.CommaNumber, quantity.BadNumber, quantity.UnknownUnit,
		quantity.WrongUnit, quantity.RatioText, quantity.ZeroOrLess, quantity.TooManyDigit} {
		r := faultOf("--dose", &quantity.SyntaxError{Got: "x", Want: "y", Why: "z", Code: f})
		if unreadable(r.Code) || string(r.Code) != string(f) {
			t.Errorf("%s: got code %q, unreadable %v", f, r.Code, unreadable(r.Code))
		}
	}
	if r := faultOf("--dose", errors.New("other")); r.Code == "" || r.Remedy == "" {
		t.Errorf("got %+v, want a code and a remedy", r)
	}
}

// TestEveryRefusalIsWhole wants a code, a message and a remedy on each refusal,
// and that nothing but the document goes to standard output.
func TestEveryRefusalIsWhole(t *testing.T) {
	for _, line := range [][]string{
		{"rate"}, {"rate", "--dose", "1 mg/h"}, {"rate", "--dose", "1 mg/kg/h", "--mix", "4 mg in 50 mL"},
		{"rate", "--dose", "1 mg/h", "--rate", "1 mL/h", "--mix", "4 mg in 50 mL"},
		{"rate", "--dose", "1 mg/h", "--dose", "2 mg/h"}, {"rate", "--dose"}, {"rate", "--nonsense", "x"}, {"rate", "-x"},
		{"rate", "--dose", "1 mg/m2/h", "--mix", "4 mg in 50 mL"}, {"rate", "--dose", "1 unit/h", "--mix", "4 mg in 50 mL"},
		{"rate", "--rate", "1 mL/h", "--mix", "4 mg in 50 mL", "--as", "bananas"},
		{"rate", "--rate", "1 mL/h", "--mix", "4 mg in 50 mL", "--as", "mmol/h"},
		{"dose"}, {"dose", "--dose", "1 mg/kg", "--weight", "9000 kg", "--concentration", "1 mg/mL"},
		{"dose", "--dose", "1 mg", "--concentration", "1 mg/mL", "extra"},
		{"mix"}, {"mix", "--amount", "4 mg"}, {"mix", "--take", "1 mL"}, {"mix", "--powder", "1 g"},
		{"mix", "--amount", "100 mg", "--final", "5 mL", "--strength", "10 mg/mL"},
		{"mix", "--powder", "1 g", "--add", "4 mL", "--displacement", "1 mL", "--final", "6 mL"},
		{"mix", "--take", "10 mL", "--strength", "1 mg/mL", "--replace-in", "5 mL"},
		{"mix", "--powder", "1 g", "--final", "5 mL", "--displacement", "6 mL"},
		{"body"}, {"body", "--weight", "70 kg", "--height", "170 cm", "--sex", "x"},
		{"body", "--weight", "170 kg", "--height", "70 cm"}, {"body", "--weight", "70 kg", "--height", "170 m"},
		{"convert"}, {"convert", "--from", "1 mg", "--to", "mmol"}, {"convert", "--from", "1 unit", "--to", "mg", "--of", "sodium chloride"},
		{"convert", "--from", "1 mg", "--to", "%"}, {"convert", "--from", "1 mg", "--to", "mEq", "--of", "sodium"},
		{"convert", "--from", "1 mEq", "--to", "mg"}, {"convert", "--from", "1 mEq", "--to", "mL", "--of", "sodium"},
		{"convert", "--from", "1 mEq", "--to", "mg", "--of", "glucose"}, {"convert", "--from", "1 mg", "--to", "mmol", "--of", "calcium chloride"},
		{"convert", "--from", "1 mg", "--to", "mmol base", "--of", "dobutamine hydrochloride"},
		{"convert", "--from", "1 mg base", "--to", "mg", "--of", "sodium chloride"}, {"convert", "--from", "1 mg", "--to", "g", "--of", "sodium"},
		{"convert", "--from", "1 mg", "--to", "mmol", "--of", "iron in sodium chloride"}, {"convert", "--from", "1 mg", "--to", "lb"},
		{"convert", "--from", "banana", "--to", "mg"}, {"convert", "--from", "1 mg/h", "--to", "mg/kg/h"}, {"convert", "--from", "1 mg", "--to", "1:1000"},
		{"nonsense"}, {"rat"}, {"body", "--style", "de", "--weight", "70 kg", "--height", "170 cm"},
	} {
		var out, faults bytes.Buffer
		code := run(append(line, "--json"), strings.NewReader(""), &out, &faults)
		var doc findings
		if err := json.Unmarshal(out.Bytes(), &doc); err != nil {
			t.Errorf("%q: %v in %s", line, err, out.String())
			continue
		}
		if code != exitRefused && code != exitUnreadable || len(doc.Refusals) == 0 {
			t.Errorf("%q: got exit %d and %d refusals", line, code, len(doc.Refusals))
		}
		for _, r := range doc.Refusals {
			if r.Code == "" || r.Message == "" || r.Remedy == "" || r.Field == "" {
				t.Errorf("%q: got %+v, want code, message, field and remedy", line, r)
			}
			if !strings.Contains(faults.String(), "drawup: refused: "+r.Code+"\n") {
				t.Errorf("%q: %s is not told on standard error", line, r.Code)
			}
		}
		if strings.Contains(out.String(), `"exact"`) {
			t.Errorf("%q: a refused request has a result: %s", line, out.String())
		}
	}
}

// TestDocumentReadsBack wants that "exact unit" of an answer, where it is a
// decimal, reads back as the same quantity, in every style.
func TestDocumentReadsBack(t *testing.T) {
	for _, style := range []string{"uk", "us", "si"} {
		flow, unit := exactOf(t, "flow_rate", "rate", "--dose", "0.1 microgram/kg/min", "--weight", "70 kg", "--mix", "4 mg in 50 mL", "--style", style)
		f, err := quantity.ParseFlowRate(flow.FloatString(2) + " " + unit)
		if err != nil || f.Rat().Cmp(flow) != 0 {
			t.Errorf("%s: got %v, %v", style, flow, err)
		}
		dose, unit := exactOf(t, "dose_rate", "rate", "--dose", "0.1 microgram/kg/min", "--weight", "70 kg", "--mix", "4 mg in 50 mL", "--style", style)
		d, err := quantity.ParseDoseRate(dose.FloatString(1) + " " + unit)
		if err != nil || d.Exact() != "0.1" {
			t.Errorf("%s: got %v %s, %v", style, dose, unit, err)
		}
	}
}

// TestKeys holds the keys that other programs may rely on, in their order.
func TestKeys(t *testing.T) {
	for _, c := range []struct {
		doc  any
		want []string
	}{
		{rateDocument{}, []string{"dose_rate", "flow_rate", "pump_rate", "delivered_dose_rate"}},
		{doseDocument{}, []string{"amount", "volume"}},
		{mixDocument{}, []string{"amount", "drug_volume", "diluent_volume", "final_volume", "concentration", "interval"}},
		{bodyDocument{}, []string{"ideal_devine", "adjusted", "lean_janmahasatian", "lean_james", "surface_mosteller", "surface_dubois", "bmi"}},
		{convertDocument{}, []string{"result"}},
		{quantityJSON{}, []string{"exact", "printed", "unit"}},
		{reasonJSON{}, []string{"code", "message", "field", "got", "want", "rule", "source", "remedy"}},
		{findings{}, []string{"refusals", "cautions"}},
	} {
		var have []string
		typ := reflect.TypeOf(c.doc)
		for i := range typ.NumField() {
			name, _, _ := strings.Cut(typ.Field(i).Tag.Get("json"), ",")
			have = append(have, name)
		}
		at := 0
		for _, name := range have {
			if at < len(c.want) && name == c.want[at] {
				at++
			}
		}
		if at != len(c.want) {
			t.Errorf("%s: got keys %q, want %q in this order", typ.Name(), have, c.want)
		}
	}
}

func TestNearest(t *testing.T) {
	for _, c := range []struct{ got, want string }{{"dos", "dose"}, {"weigth", "weight"}, {"mixx", "mix"}, {"zzzzzz", ""}} {
		remedy := nearestOr(c.got, []string{"dose", "weight", "mix", "concentration"}, "--", "none")
		if c.want == "" && remedy != "none" || c.want != "" && !strings.Contains(remedy, "--"+c.want+" ") {
			t.Errorf("%s: got %q, want %q", c.got, remedy, c.want)
		}
	}
}

// failing is an output that cannot be written to.
type failing struct{}

func (failing) Write([]byte) (int, error) { return 0, errors.New("no room") }

func TestOutputThatFails(t *testing.T) {
	var faults bytes.Buffer
	for _, args := range [][]string{{"help"}, {"convert", "--from", "1 g", "--to", "mg"}} {
		if code := run(args, strings.NewReader(""), failing{}, &faults); code != exitUnreadable {
			t.Errorf("%q: got exit %d, want %d", args, code, exitUnreadable)
		}
	}
	if !strings.Contains(faults.String(), "output-unwritable") {
		t.Errorf("got %q", faults.String())
	}
}
