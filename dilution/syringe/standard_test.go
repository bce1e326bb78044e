package syringe

import (
	"errors"
	"strings"
	"testing"

	"drawup/dilution/quantity"
)

// ISO 7886-1:1993, table 1, from memory where the reference says so: the widest
// scale interval and the largest dead space of each size. Each row is the last
// barrel that passes and the first that does not.
func TestStandard(t *testing.T) {
	for _, c := range []struct{ nominal, step, coarser, dead, more string }{
		{"1", "0.05", "0.1", "0.07", "0.08"},
		{"2", "0.2", "0.25", "0.07", "0.08"},
		{"5", "0.5", "1", "0.075", "0.08"},
		{"10", "1", "2", "0.1", "0.11"},
		{"20", "2", "4", "0.15", "0.16"},
		{"30", "2", "3", "0.17", "0.18"},
		{"50", "5", "10", "0.2", "0.21"},
		{"60", "5", "6", "0.2", "0.21"},
	} {
		made := func(step string) Barrel {
			b, err := New(mL(t, c.nominal), mL(t, step), "site")
			if err != nil {
				t.Fatal(err)
			}
			return b
		}
		if err := made(c.step).Standard(mL(t, c.dead)); err != nil {
			t.Errorf("%s mL in %s mL, dead space %s mL: got %v", c.nominal, c.step, c.dead, err)
		}
		var off *StandardError
		if err := made(c.coarser).Standard(quantity.Volume{}); !errors.As(err, &off) || off.What != "graduation" || off.Most.Exact() != c.step || off.Own {
			t.Errorf("%s mL in %s mL: got %v, want it refused", c.nominal, c.coarser, err)
		}
		if err := made(c.step).Standard(mL(t, c.more)); !errors.As(err, &off) || off.What != "dead space" || off.Most.Exact() != c.dead {
			t.Errorf("%s mL, dead space %s mL: got %v, want it refused", c.nominal, c.more, err)
		}
	}
}

// Every barrel on record keeps the standard; our own bounds stop what nobody
// could read or hold.
func TestStandardOfKnownBarrels(t *testing.T) {
	for _, b := range Known() {
		if err := b.Standard(quantity.Volume{}); err != nil {
			t.Errorf("%s mL: %v", b.Nominal().Exact(), err)
		}
	}
	for _, c := range [][3]string{{"50", "0.1", "lines"}, {"10000", "1000", "large"}} {
		b, err := New(mL(t, c[0]), mL(t, c[1]), "site")
		if err != nil {
			t.Fatal(err)
		}
		var off *StandardError
		if err := b.Standard(quantity.Volume{}); !errors.As(err, &off) || !off.Own || !strings.Contains(err.Error(), c[2]) {
			t.Errorf("%s mL in %s mL: got %v, want our own bound", c[0], c[1], err)
		}
	}
	var missing *quantity.NotGivenError
	if err := (Barrel{}).Standard(quantity.Volume{}); !errors.As(err, &missing) {
		t.Errorf("no barrel: got %v", err)
	}
}

// A site's barrels may be graduated against the rule that the smaller is the
// finer. The line that moves the volume least is taken, then the smallest
// barrel; a volume under a fifth of a barrel stays out of it while another holds
// it. Worked by hand.
func TestMeasureOnSiteBarrels(t *testing.T) {
	made := func(nominal, step string) Barrel {
		b, err := New(mL(t, nominal), mL(t, step), "site")
		if err != nil {
			t.Fatal(err)
		}
		return b
	}
	stock := []Barrel{made("50", "1"), made("5", "0.5"), made("10", "0.2")}
	for _, c := range []struct{ volume, nominal, read string }{
		{"4.6", "10", "4.6"}, // 5 mL has lines at 4.5 and 5
		{"4.5", "5", "4.5"},  // both have it near, 10 mL at 4.6
		{"5", "5", "5"},      // both have a line: the smaller
		{"8", "10", "8"},
		{"1.6", "5", "1.5"}, // 1.6 is under a fifth of 10 mL
		{"12", "50", "12"},
	} {
		r, err := Measure(mL(t, c.volume), stock, mL(t, "0.1"), per(t, "10"))
		if err != nil || r.Barrel.Nominal().Exact() != c.nominal || r.Volume.Exact() != c.read {
			t.Errorf("%s mL: got %s mL on %s mL, %v, want %s on %s", c.volume, r.Volume.Exact(), r.Barrel.Nominal().Exact(), err, c.read, c.nominal)
		}
	}
}
