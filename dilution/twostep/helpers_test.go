package twostep

import (
	"drawup/dilution/quantity"
	"drawup/dilution/syringe"
)

// failing is what the helpers need of a test, a benchmark or a property.
type failing interface {
	Helper()
	Fatal(args ...any)
	Fatalf(format string, args ...any)
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

func barrelOf(t failing, nominal, step string) syringe.Barrel {
	t.Helper()
	b, err := syringe.New(mL(t, nominal), mL(t, step), "invented for this test")
	if err != nil {
		t.Fatal(err)
	}
	return b
}

// wanted is a target of conc in volume from strength, with the stocked barrels
// and the limits of a silent site: 0.1 mL, 5 %.
func wanted(t failing, strength, target, volume string) Wanted {
	t.Helper()
	return Wanted{Strength: conc(t, strength), Concentration: conc(t, target), Volume: mL(t, volume),
		Barrels: syringe.Stocked(), Smallest: mL(t, "0.1"), Tolerance: per(t, "5")}
}
