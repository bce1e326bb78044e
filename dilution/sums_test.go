package dilution_test

import (
	"errors"
	"math/big"
	"testing"

	"drawup/dilution"
	"drawup/dilution/quantity"
)

// TestOverfill holds every row of the table of excess volumes, USP 29-NF 24,
// general chapter 1151; row A176 is 0.5 mL of a mobile fluid, 20 %.
func TestOverfill(t *testing.T) {
	for _, c := range []struct{ labelled, mobile, viscous string }{
		{"0.5", "0.1", "0.12"}, {"1", "0.1", "0.15"}, {"2", "0.15", "0.25"}, {"5", "0.3", "0.5"}, {"10", "0.5", "0.7"},
		{"20", "0.6", "0.9"}, {"30", "0.8", "1.2"}, {"50", "1", "1.5"}, {"250", "5", "7.5"},
	} {
		v, err := quantity.ParseVolume(c.labelled + " mL")
		if err != nil {
			t.Fatal(err)
		}
		for f, want := range map[dilution.Fluidity]string{dilution.Mobile: c.mobile, dilution.Viscous: c.viscous} {
			if got, err := dilution.Overfill(v, f); err != nil || got.Exact() != want {
				t.Errorf("%s mL: got %s, %v, want %s", c.labelled, got.Exact(), err, want)
			}
		}
	}
	var unlisted *dilution.OverfillUnlisted
	if _, err := dilution.Overfill(quantity.Millilitres(big.NewRat(3, 1)), dilution.Mobile); !errors.As(err, &unlisted) {
		t.Errorf("3 mL, between two rows: got %v", err)
	}
	if _, err := dilution.Overfill(quantity.Volume{}, dilution.Mobile); err == nil {
		t.Error("no volume: got no error")
	}
	if _, err := dilution.Overfill(quantity.Millilitres(big.NewRat(1, 1)), 0); err == nil {
		t.Error("no fluid: got no error")
	}
}

// TestWeightMade: 5 microgram/kg/min for each 1 mL/h at 6 kg is 90 mg in 50 mL
// (nurses' forum, the rule of three, 2006, row A139); 6 mg for each kg in 100 mL
// and 1 mL/h is 1 microgram/kg/min (rule of six, Institute for Safe Medication
// Practices, Medication Safety Alert 2005;10(4)); 0.6 mg for each kg is a tenth.
func TestWeightMade(t *testing.T) {
	for _, c := range []struct{ each, weight, volume, want string }{
		{"5 mcg/kg/min", "6 kg", "50 mL", "90"},
		{"1 microgram/kg/min", "10 kg", "100 mL", "60"},
		{"0.1 microgram/kg/min", "10 kg", "100 mL", "6"},
		{"1 microgram/kg/min", "10 kg", "50 mL", "30"},
		{"0.1 microgram/kg/min", "6 kg", "50 mL", "1.8"},
		{"60 microgram/kg/h", "10 kg", "50 mL", "30"},
	} {
		each, err1 := quantity.ParseDoseRate(c.each)
		w, err2 := quantity.ParseBodyWeight(c.weight)
		v, err3 := quantity.ParseVolume(c.volume)
		if err := errors.Join(err1, err2, err3); err != nil {
			t.Fatal(err)
		}
		got, err := dilution.WeightMade(each, w, v)
		if err != nil || got.Exact(quantity.Milligram()) != c.want {
			t.Errorf("%s, %s, %s: got %s, %v, want %s mg", c.each, c.weight, c.volume, got.Exact(quantity.Milligram()), err, c.want)
		}
	}
	absolute, _ := quantity.ParseDoseRate("1 mg/h")
	w, _ := quantity.ParseBodyWeight("6 kg")
	var basis *quantity.BasisError
	if _, err := dilution.WeightMade(absolute, w, quantity.Millilitres(big.NewRat(50, 1))); !errors.As(err, &basis) {
		t.Errorf("an absolute dose rate: got %v", err)
	}
}

// TestNearestStandard takes the nearest by ratio. The starter's noradrenaline has
// 80, 160 and 320 micrograms/mL: 100 is nearer to 80 (5/4 against 8/5), and 120
// nearer to 160 (4/3 against 3/2).
func TestNearestStandard(t *testing.T) {
	d, _, ok := starter(t).Find("noradrenaline")
	if !ok || len(d.Standards) == 0 {
		t.Fatal("no standard preparations of noradrenaline")
	}
	for got, want := range map[string]string{
		"100 microgram/mL": "4 mg in 50 mL", "120 microgram/mL": "8 mg in 50 mL", "1 microgram/mL": "4 mg in 50 mL", "1 mg/mL": "16 mg in 50 mL",
	} {
		c, err := quantity.ParseConcentration(got)
		if err != nil {
			t.Fatal(err)
		}
		if s, _, ok := dilution.NearestStandard(d, c, "central"); !ok || s.ID != want {
			t.Errorf("beside %s: got %q, want %q", got, s.ID, want)
		}
		if s, _, ok := dilution.NearestStandard(d, c, "peripheral"); ok {
			t.Errorf("beside %s, peripheral: got %q, listed for central lines", got, s.ID)
		}
	}
	units, _ := quantity.ParseConcentration("5 units/mL")
	if s, _, ok := dilution.NearestStandard(d, units, ""); ok {
		t.Errorf("units: got %s", s.ID)
	}
}
