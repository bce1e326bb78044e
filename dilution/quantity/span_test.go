package quantity

import (
	"math/big"
	"testing"
)

func TestDurations(t *testing.T) {
	for text, want := range map[string]string{
		"6 h": "360", "6 hours": "360", "1.5 h": "90", "90 min": "90", "1 h 30 min": "90", "24 h": "1440", "2 days": "2880",
		"1 day 6 h": "1800", "30 seconds": "0.5", "90 s": "1.5", "1.5 min": "1.5", "1 hour": "60", "2 h 0 min": "120",
	} {
		d, err := ParseDuration(text)
		if err != nil || d.Exact() != want {
			t.Errorf("%q: got %q, %v, want %s min", text, d.Exact(), err, want)
		}
	}
	for _, c := range []struct {
		text   string
		code   Fault
		likely string
	}{
		{"6", UnknownUnit, ""}, {"6 m", WrongUnit, ""}, {"6:30", BadNumber, "6 h 30 min"}, {"6:00", BadNumber, "6 h"},
		{"6 hrs", WrongUnit, "6 h"}, {"1h30", UnknownUnit, "1 h 30 min"}, {"1 h 90 min", BadNumber, ""}, {"1.5 h 10 min", BadNumber, ""},
		{"30 min 1 h", BadNumber, ""}, {"0 h", ZeroOrLess, ""}, {"-6 h", BadNumber, ""}, {"6,5 h", CommaNumber, "6.5 h"}, {"", EmptyText, ""},
		{"6 mL", WrongUnit, ""}, {"6 years", UnknownUnit, ""}, {"h", BadNumber, ""},
	} {
		_, err := ParseDuration(c.text)
		checkRefused(t, c.text, err, c.code, c.likely)
	}
}

// A span is shown rounded down, so that no time is promised that is not there.
func TestDurationShown(t *testing.T) {
	for _, c := range []struct {
		minutes *big.Rat
		want    string
	}{
		{big.NewRat(360, 1), "6 h"}, {big.NewRat(90, 1), "1 h 30 min"}, {big.NewRat(1699, 3), "9 h 26 min"},
		{big.NewRat(3, 2), "1 min 30 s"}, {big.NewRat(59, 1), "59 min"}, {big.NewRat(1, 120), "0 s"},
		{big.NewRat(60000, 1), "1,000 h"}, {big.NewRat(119, 1), "1 h 59 min"},
	} {
		if got := UK().Duration(Minutes(c.minutes)); got != c.want {
			t.Errorf("%s min: got %q, want %q", c.minutes, got, c.want)
		}
	}
	if got := UK().Duration(Duration{}); got != "" {
		t.Errorf("no span prints %q", got)
	}
}

// TestVolumeTimeFlow: 750 mL in 6 h is 125 mL/h (open nursing dosage-calculation
// course, module 6, row A110); the other two by hand.
func TestVolumeTimeFlow(t *testing.T) {
	v, f, d := Millilitres(big.NewRat(750, 1)), MillilitresPerHour(big.NewRat(125, 1)), Minutes(big.NewRat(360, 1))
	if got, err := v.Over(d); err != nil || got.Exact() != "125" {
		t.Errorf("flow: got %s, %v", got.Exact(), err)
	}
	if got, err := v.Lasts(f); err != nil || got.Exact() != "360" {
		t.Errorf("time: got %s, %v", got.Exact(), err)
	}
	if got, err := f.During(d); err != nil || got.Exact() != "750" {
		t.Errorf("volume: got %s, %v", got.Exact(), err)
	}
	for name, err := range map[string]error{
		"over nothing": faultOnly(v.Over(Duration{})), "no volume": faultOnly(Volume{}.Over(d)), "no flow": faultOnly(v.Lasts(FlowRate{})),
		"zero flow": faultOnly(v.Lasts(MillilitresPerHour(new(big.Rat)))), "during nothing": faultOnly(f.During(Duration{})),
	} {
		if err == nil {
			t.Errorf("%s: got no error", name)
		}
	}
}

func faultOnly[T any](_ T, err error) error { return err }

// TestDoseOverTime: 225 microgram/min for 1.5 min is 337.5 micrograms
// (remifentanil data set, R package nlme, row A173); a load of 0.05 mg/kg and
// 0.375 microgram/kg/min for 24 h are 0.59 mg/kg (US prescribing information,
// milrinone, row A055).
func TestDoseOverTime(t *testing.T) {
	rate, _ := ParseDoseRate("225 mcg/min")
	got, err := rate.During(Minutes(big.NewRat(3, 2)))
	if err != nil || UK().Dose(got) != "337.5 micrograms" {
		t.Errorf("got %s, %v", UK().Dose(got), err)
	}
	slow, _ := ParseDoseRate("0.375 microgram/kg/min")
	load, _ := ParseDose("0.05 mg/kg")
	day, err := slow.During(Minutes(big.NewRat(1440, 1)))
	if err != nil {
		t.Fatal(err)
	}
	total, err := load.Plus(day)
	if err != nil || UK().Dose(total) != "0.59 mg/kg" {
		t.Errorf("got %s, %v", UK().Dose(total), err)
	}
	if _, err := load.Plus(got); err == nil {
		t.Error("a dose per kg and an absolute one add up")
	}
	units, _ := ParseDose("5 units")
	if _, err := units.Plus(got); err == nil {
		t.Error("units and mass add up")
	}
}

// TestDrops: 1000 mL in 8 h at 20 drops/mL is 41.67, counted 42 (OSCE revision
// notes, row A116).
func TestDrops(t *testing.T) {
	set, err := ParseDropFactor("20 drops/mL")
	if err != nil {
		t.Fatal(err)
	}
	drops, err := MillilitresPerHour(big.NewRat(125, 1)).Drops(set)
	if err != nil || drops.Exact() != "125/3" || UK().DropRate(drops) != "41.7 drops/min" {
		t.Errorf("got %s, %q, %v", drops.Exact(), UK().DropRate(drops), err)
	}
	counted, lost, err := drops.Counted()
	if err != nil || counted.Exact() != "42" || lost.RatString() != "4/5" {
		t.Errorf("got %s, %v, %v", counted.Exact(), lost, err)
	}
	if flow, err := counted.Flow(set); err != nil || flow.Exact() != "126" {
		t.Errorf("got %s, %v, want 126 mL/h", flow.Exact(), err)
	}
	one, err := ParseDropRate("1 drop/min")
	if err != nil || UK().DropRate(one) != "1 drop/min" {
		t.Errorf("got %q, %v", UK().DropRate(one), err)
	}
	for text, likely := range map[string]string{
		"20 gtt/mL": "20 drops/mL", "20 drops": "20 drops/mL", "20": "", "0 drops/mL": "", "20 drops/min": "", "20 mL": "", "20 drops/kg": "", "20 blobs/mL": "",
	} {
		if _, err := ParseDropFactor(text); err == nil || err.(*SyntaxError).Likely != likely {
			t.Errorf("%q: got %v, want it refused, likely %q", text, err, likely)
		}
	}
	for text, likely := range map[string]string{"42 gtt/min": "42 drops/min", "42 drops": "42 drops/min", "42 drops/mL": "", "42 mL/min": ""} {
		if _, err := ParseDropRate(text); err == nil || err.(*SyntaxError).Likely != likely {
			t.Errorf("%q: got %v, want it refused, likely %q", text, err, likely)
		}
	}
}

// TestFlowPerKilogram: 1 mL/min/kg at 50 kg is 3 L/h (clinPK 0.14.0, its
// published unit tests, row A156).
func TestFlowPerKilogram(t *testing.T) {
	f, err := ParseFlowPerKilogram("1 mL/kg/min")
	if err != nil {
		t.Fatal(err)
	}
	if got, err := f.For(Kilograms(big.NewRat(50, 1))); err != nil || got.Exact() != "3000" {
		t.Errorf("got %s, %v, want 3000 mL/h", got.Exact(), err)
	}
	if _, err := f.For(BodyWeight{}); err == nil {
		t.Error("a flow of nobody")
	}
	_, err = ParseFlowPerKilogram("1 mL/min/kg")
	checkRefused(t, "1 mL/min/kg", err, WrongUnit, "1 mL/kg/min")
	for _, text := range []string{"1 mL/h", "1 mg/kg/h", "0 mL/kg/h", "1 mL/kg", "mL/kg/h", "1 mL/kg/year"} {
		if _, err := ParseFlowPerKilogram(text); err == nil {
			t.Errorf("%q passes", text)
		}
	}
}
