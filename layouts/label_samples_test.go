package layouts_test

import (
	"bytes"
	"strings"
	"testing"
	"time"

	"drawup/dilution/recheck"
	"drawup/labels"
	"drawup/layouts"
	"drawup/layouts/ink"
	"drawup/layouts/pdf"
	"drawup/layouts/pdf/readback"
)

// allPassed stands for a second route that has passed everything: these tests
// are about paper.
type allPassed struct{}

func (allPassed) Covers([]recheck.Figure) bool { return true }

// sample is an invented label. Names and classes are those of the acceptance
// fixtures; amounts, times and people are made up.
func sample(class, name, concentration, amount, atc, coded string) labels.Label {
	c, _ := labels.ClassOf(class)
	short := "(91)" + atc + "(92)261201193000001003(93)" + coded
	held := strings.NewReplacer(" micrograms", "ug", " mcg", "ug", " units", "unit", ",", "", " ", "").Replace(amount)
	return labels.Label{
		Number: 1, Class: c, Name: name,
		Concentration: labels.Cell{Text: concentration, Figure: recheck.Concentration},
		Amount:        labels.Line{{Text: amount, Figure: recheck.AmountInSyringe}, {Text: " in "}, {Text: "10 mL", Figure: recheck.FinalVolume}},
		UseBy:         labels.Line{{Text: "use by "}, {Text: "01 Dec 2026 19:30", Figure: recheck.UseBy}},
		Prepared:      labels.Line{{Text: "made "}, {Text: "01 Dec 2026 07:30", Figure: recheck.Prepared}, {Text: " A. Example"}},
		Serial:        labels.Cell{Text: "00001003", Figure: recheck.Serial},
		Codes:         []labels.Cell{{Text: short + "(94)" + held + "(95)7a83c0d1", Figure: "code.1.text"}, {Text: short, Figure: "code.2.text"}},
	}
}

// samples holds one label of every class.
func samples() []labels.Label {
	return []labels.Label{
		sample("IND", "Etomidate", "2 mg/mL", "20 mg", "N01AX07", "2mg/mL"),
		sample("BZD", "Midazolam", "1 mg/mL", "10 mg", "N05CD08", "1mg/mL"),
		sample("BZD-A", "Flumazenil", "100 micrograms/mL", "1 mg", "V03AB25", "100ug/mL"),
		sample("NMB", "Rocuronium", "10 mg/mL", "100 mg", "M03AC09", "10mg/mL"),
		sample("SUX", "Suxamethonium", "50 mg/mL", "100 mg", "M03AB01", "50mg/mL"),
		sample("NMB-R", "Sugammadex", "100 mg/mL", "1 g", "V03AB35", "100mg/mL"),
		sample("OPI", "Fentanyl", "50 micrograms/mL", "500 micrograms", "N01AH01", "50ug/mL"),
		sample("OPI-A", "Naloxone", "40 micrograms/mL", "400 micrograms", "V03AB15", "40ug/mL"),
		sample("VAS", "Ephedrine", "3 mg/mL", "30 mg", "C01CA26", "3mg/mL"),
		sample("ADR", "Adrenaline", "10 micrograms/mL", "100 micrograms", "C01CA24", "10ug/mL"),
		sample("HYP", "Labetalol", "5 mg/mL", "50 mg", "C07AG01", "5mg/mL"),
		sample("LA", "Lidocaine", "20 mg/mL", "200 mg", "N01BB02", "20mg/mL"),
		sample("ACH", "Glycopyrronium", "200 micrograms/mL", "2 mg", "A03AB02", "200ug/mL"),
		sample("AEM", "Metoclopramide", "5 mg/mL", "50 mg", "A03FA01", "5mg/mL"),
		sample("HEP", "Heparin", "100 units/mL", "1,000 units", "B01AB01", "100unit/mL"),
		sample("PRO", "Protamine", "10 mg/mL", "100 mg", "V03AB14", "10mg/mL"),
		sample("OTH", "Dexmedetomidine", "4 micrograms/mL", "40 micrograms", "N05CM18", "4ug/mL"),
	}
}

func stock(t testing.TB, name string) layouts.Stock {
	t.Helper()
	s, ok := layouts.StockNamed(name)
	if !ok {
		t.Fatalf("no stock %q", name)
	}
	return s
}

// placed lays labels out and fails on any refusal.
func placed(t testing.TB, list []labels.Label, s layouts.Stock, opt layouts.Options) []ink.Page {
	t.Helper()
	pages, refused := layouts.Labels(list, s, make([]allPassed, len(list)), opt)
	if len(refused) > 0 {
		t.Fatalf("refused: %v", refused)
	}
	return pages
}

// printed writes pages as PDF and opens them with the independent renderer.
func printed(t testing.TB, pages []ink.Page) *readback.File {
	t.Helper()
	var out bytes.Buffer
	err := pdf.Write(&out, pdf.Document{Pages: pages, Title: "labels", Creator: "drawup test", Language: "en-GB",
		Made: time.Date(2026, 12, 1, 7, 30, 0, 0, time.UTC)})
	if err != nil {
		t.Fatal(err)
	}
	return readback.Open(t, out.Bytes())
}
