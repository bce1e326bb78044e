package main

import (
	"bytes"
	"encoding/json"
	"fmt"
	"io"
	"strings"
	"testing"
	"time"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/labels"
)

// A readAnswer is the JSON answer of drawup read, as another program sees it.
type readAnswer struct {
	Kind  string
	Drug  *struct{ Names []string }
	UseBy *struct {
		Printed string
		Past    bool
	} `json:"use_by"`
	Concentration *struct{ Printed string }
	Second        *struct{ Printed string } `json:"second_concentration"`
	Amount        *struct{ Printed string }
	Serial, Batch string
	Formulary     *struct{ Same bool }
	Refusals      []struct{ Code string }
	Cautions      []struct{ Code string }
}

func answerOf(t *testing.T, args ...string) readAnswer {
	t.Helper()
	var out, faults bytes.Buffer
	run(append([]string{"read", "--json"}, args...), strings.NewReader(""), &out, &faults)
	var doc readAnswer
	if err := json.Unmarshal(out.Bytes(), &doc); err != nil {
		t.Fatalf("%v: %v\n%s", args, err, out.String())
	}
	return doc
}

// Every form of every code of the demonstration, as a scanner sends it and as a
// person types it, is said in the words that stand on its label.
func TestReadSaysTheLabel(t *testing.T) {
	j := demoJob(t)
	for _, l := range j.labels {
		for _, code := range l.Codes {
			for _, text := range []string{code.Text, "]d2" + symbolText(code.Text), strings.ReplaceAll(symbolText(code.Text), "\x1d", "<GS>")} {
				got := answerOf(t, text, "--at", "2026-12-01 08:00", "--order", demo)
				if err := saysLabel(got, l); err != nil {
					t.Errorf("%q: %v", text, err)
				}
			}
		}
	}
}

// saysLabel compares an answer with a label, field by field.
func saysLabel(got readAnswer, l labels.Label) error {
	switch {
	case len(got.Refusals)+len(got.Cautions) > 0:
		return fmt.Errorf("got %v, %v", got.Refusals, got.Cautions)
	case got.Drug == nil || len(got.Drug.Names) == 0 || !strings.HasPrefix(labels.Capital(got.Drug.Names[0]), l.Name):
		return fmt.Errorf("got drug %v, want %s", got.Drug, l.Name)
	case got.Concentration == nil || got.Concentration.Printed != l.Concentration.Text:
		return fmt.Errorf("got concentration %v, want %s", got.Concentration, l.Concentration.Text)
	case got.Amount != nil && got.Amount.Printed != l.Amount[0].Text:
		return fmt.Errorf("got amount %v, want %s", got.Amount, l.Amount[0].Text)
	case got.Second != nil && got.Second.Printed != l.SecondConcentration.Text:
		return fmt.Errorf("got second concentration %v, want %s", got.Second, l.SecondConcentration.Text)
	case got.UseBy == nil || "use by "+got.UseBy.Printed != l.UseBy.Text() || got.UseBy.Past:
		return fmt.Errorf("got use-by %+v, want %s", got.UseBy, l.UseBy.Text())
	case got.Serial != l.Serial.Text:
		return fmt.Errorf("got serial %s, want %s", got.Serial, l.Serial.Text)
	case got.Batch != "" && got.Batch != l.Digest:
		return fmt.Errorf("got batch %s, want %s", got.Batch, l.Digest)
	case got.Formulary != nil && !got.Formulary.Same:
		return fmt.Errorf("got another formulary")
	}
	return nil
}

// Whatever is scanned, there is an answer or a refusal, whole as JSON and as
// words, and nothing of it steers a terminal.
func FuzzRead(f *testing.F) {
	form, err := formulary.Default()
	if err != nil {
		f.Fatal(err)
	}
	noon := time.Date(2026, 12, 1, 12, 0, 0, 0, time.UTC)
	for _, seed := range []string{"]d291N01AX07<GS>92261201193000001003<GS>932mg/mL", "(01)09521234000006(17)270200(10)A", "91N01AX0792261201193000001003932mg/mL", "", "-", "\x1b[31m", "(99)\x1b[2J"} {
		f.Add(seed)
	}
	f.Fuzz(func(t *testing.T, text string) {
		r, doc := &readRequest{style: quantity.UK(), text: text}, &readDocument{Elements: []elementJSON{}}
		r.read(doc, form, nil, noon)
		for _, asJSON := range []bool{true, false} {
			var out, faults bytes.Buffer
			code := finish(env{stdout: &out, stderr: &faults}, asJSON, doc, func(w io.Writer) { tellRead(w, doc) }, r.faults)
			if code != exitMade && code != exitRefused || (out.Len() == 0) == (code == exitMade) && !asJSON {
				t.Errorf("%q: exit %d with %q", text, code, out.String())
			}
			if asJSON && !json.Valid(out.Bytes()) {
				t.Errorf("%q: got %s", text, out.String())
			}
			if strings.ContainsAny(out.String()+faults.String(), "\x1b\x1d\x00") {
				t.Errorf("%q: steers the terminal: %q %q", text, out.String(), faults.String())
			}
		}
	})
}
