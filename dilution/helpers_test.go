package dilution_test

import (
	"fmt"
	"strings"
	"testing"
	"time"

	"drawup/dilution"
	"drawup/dilution/body"
	"drawup/dilution/formulary"
	"drawup/dilution/order"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// starter is the formulary that is shipped.
func starter(t testing.TB) *formulary.Formulary {
	t.Helper()
	f, err := formulary.Default()
	if err != nil {
		t.Fatal(err)
	}
	return f
}

// plan reads an order from text and plans it, as the command does.
func plan(t interface{ Helper() }, f *formulary.Formulary, text string) (dilution.List, refusal.List) {
	t.Helper()
	o, faults := order.Read("order.toml", []byte(text))
	return dilution.NewList(o, f, o.Session.Prepared.Value, nil, faults)
}

// session opens an order; figures and people are invented.
const session = `[session]
place = "theatre 2"
date = "2026-12-01"
prepared = "07:30"
preparer = "A. Example"
invented = true
`

// An adult of 70 kg and 168 cm.
const adult = `
[[patient]]
id = "A"
sex = "female"
age = "40 years"
height = "168 cm"
weight = "70 kg"
`

// one plans a single syringe or infusion of an adult and demands that it is
// made; body holds the lines after the table's header.
func one(t testing.TB, table, body string) dilution.Plan {
	t.Helper()
	return oneFor(t, adult, table, body)
}

func oneFor(t testing.TB, patient, table, body string) dilution.Plan {
	t.Helper()
	text := session + patient + "\n[[patient." + table + "]]\n" + body
	list, reasons := plan(t, starter(t), text)
	if reasons.Refused() {
		t.Fatalf("refused:\n%v\norder:\n%s", reasons.Refusals(), text)
	}
	if len(list.Plans) != 1 {
		t.Fatalf("got %d plans, want 1", len(list.Plans))
	}
	return list.Plans[0]
}

// codesOf plans a single syringe and returns the codes that refuse it.
func codesOf(t testing.TB, f *formulary.Formulary, patient, table, body string) []refusal.Code {
	t.Helper()
	_, reasons := plan(t, f, session+patient+"\n[[patient."+table+"]]\n"+body)
	return reasons.Refusals().Codes()
}

// want compares what would be printed.
func want(t testing.TB, what, got, expected string) {
	t.Helper()
	if got != expected {
		t.Errorf("%s: got %s, want %s", what, got, expected)
	}
}

// uk prints figures as paper of the UK style does.
func uk() quantity.Style { return quantity.UK() }

// lines joins the lines of a table of an order.
func lines(parts ...string) string { return strings.Join(parts, "\n") + "\n" }

// key is one line of an order.
func key(name, value string) string { return fmt.Sprintf("%s = %q", name, value) }

// at is a time in the zone of the session's default.
func at(year int, month time.Month, day, hour, minute int) time.Time {
	return time.Date(year, month, day, hour, minute, 0, 0, time.UTC)
}

// adultAge is forty years.
func adultAge(t testing.TB) body.Age {
	t.Helper()
	a, err := body.ParseAge("40 years")
	if err != nil {
		t.Fatal(err)
	}
	return a
}
