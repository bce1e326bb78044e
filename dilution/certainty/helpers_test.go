package certainty

import (
	"math/big"
	"testing"

	"drawup/dilution/quantity"
	"drawup/dilution/syringe"
)

// failing is what the helpers need of a test or of a property.
type failing interface {
	Helper()
	Fatal(args ...any)
}

func mL(t failing, s string) quantity.Volume {
	t.Helper()
	v, err := quantity.ParseVolume(s + " mL")
	if err != nil {
		t.Fatal(err)
	}
	return v
}

func per(t failing, s string) quantity.Percent {
	t.Helper()
	p, err := quantity.ParsePercent(s + " %")
	if err != nil {
		t.Fatal(err)
	}
	return p
}

func conc(t failing, s string) quantity.Concentration {
	t.Helper()
	c, err := quantity.ParseConcentration(s)
	if err != nil {
		t.Fatal(err)
	}
	return c
}

// in is a reading of volume in the known barrel of a nominal capacity.
func in(t failing, volume, nominal string) Measured {
	t.Helper()
	b, ok := syringe.Find(mL(t, nominal))
	if !ok {
		t.Fatal("no barrel of " + nominal + " mL")
	}
	return Measured{Volume: mL(t, volume), Barrel: b}
}

// named is in, for a syringe that is read more than once.
func named(t failing, volume, nominal, name string) Measured {
	t.Helper()
	m := in(t, volume, nominal)
	m.Syringe = name
	return m
}

func of(t failing, p Preparation) Result {
	t.Helper()
	r, err := Of(p)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

// tenths is p half up to one decimal, as the published figures are.
func tenths(t *testing.T, p quantity.Percent) string {
	t.Helper()
	return p.Rat().FloatString(1)
}

// root2 is half of U, the standard uncertainty, in per cent to two decimals.
func root2(r Result) string {
	return new(big.Rat).Quo(r.Expanded.Rat(), big.NewRat(2, 1)).FloatString(2)
}

func zeroPercent() quantity.Percent { return quantity.PerCent(new(big.Rat)) }
