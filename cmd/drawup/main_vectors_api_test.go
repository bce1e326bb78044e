package main

import (
	"math/big"
	"strings"
	"testing"

	"drawup/dilution/body"
	"drawup/dilution/pump"
	"drawup/dilution/quantity"
	"drawup/dilution/salts"
	"drawup/dilution/syringe"
)

// withAPI adds the sum through the packages, without the command.
func (s sum) withAPI() sum {
	flags := map[string]string{}
	for i := 1; i+1 < len(s.args); i += 2 {
		flags[strings.TrimPrefix(s.args[i], "--")] = s.args[i+1]
	}
	command, key := s.args[0], s.key
	s.api = func(t *testing.T) *big.Rat {
		t.Helper()
		p := packages{t, flags}
		switch command {
		case "rate":
			return p.rate(key)
		case "dose":
			return p.dose(key)
		case "mix":
			return p.mix(key)
		case "body":
			return p.body(key)
		case "convert":
			return p.convert()
		}
		t.Fatalf("no package route for %s", command)
		return nil
	}
	return s
}

// packages works sums by the packages below the command.
type packages struct {
	t     *testing.T
	flags map[string]string
}

func must[T any](p packages) func(T, error) T {
	return func(x T, err error) T {
		p.t.Helper()
		if err != nil {
			p.t.Fatal(err)
		}
		return x
	}
}

func (p packages) concentration() quantity.Concentration {
	text := p.flags["concentration"] + p.flags["mix"] + p.flags["strength"]
	return must[quantity.Concentration](p)(quantity.ParseConcentration(text))
}

func (p packages) volume(flag string) quantity.Volume {
	return must[quantity.Volume](p)(quantity.ParseVolume(p.flags[flag]))
}

func (p packages) per() pump.Per {
	if w, ok := p.flags["weight"]; ok {
		return pump.PerWeight(must[quantity.BodyWeight](p)(quantity.ParseBodyWeight(w)))
	}
	return pump.PerNothing()
}

func (p packages) rate(key string) *big.Rat {
	if key == "flow_rate" {
		d := must[quantity.DoseRate](p)(quantity.ParseDoseRate(p.flags["dose"]))
		return must[quantity.FlowRate](p)(pump.Flow(d, p.per(), p.concentration())).Rat()
	}
	like := must[quantity.DoseRate](p)(quantity.ParseDoseRate("1 " + p.flags["as"]))
	f := must[quantity.FlowRate](p)(quantity.ParseFlowRate(p.flags["rate"]))
	return must[quantity.DoseRate](p)(pump.Delivered(f, p.per(), p.concentration(), like)).Rat()
}

func (p packages) dose(key string) *big.Rat {
	d := must[quantity.Dose](p)(quantity.ParseDose(p.flags["dose"]))
	var a quantity.Amount
	if w, ok := p.flags["weight"]; ok {
		a = must[quantity.Amount](p)(d.For(must[quantity.BodyWeight](p)(quantity.ParseBodyWeight(w))))
	} else {
		a = must[quantity.Amount](p)(d.Amount())
	}
	if key == "amount" {
		return a.Rat()
	}
	return must[quantity.Volume](p)(a.DrawnAt(p.concentration())).Rat()
}

func (p packages) mix(key string) *big.Rat {
	var a quantity.Amount
	var final quantity.Volume
	switch {
	case p.flags["powder"] != "":
		a = must[quantity.Amount](p)(quantity.ParseAmount(p.flags["powder"]))
		final = p.volume("add").Plus(p.volume("displacement"))
	case p.flags["take"] != "":
		take := p.volume("take")
		a = must[quantity.Amount](p)(take.Holds(p.concentration()))
		final = p.finalOf(take)
	default:
		a = must[quantity.Amount](p)(quantity.ParseAmount(p.flags["amount"]))
		final = p.volume("final")
	}
	switch key {
	case "amount":
		return a.Rat()
	case "final_volume":
		return final.Rat()
	}
	return must[quantity.Concentration](p)(a.In(final)).Rat()
}

// finalOf is the volume in the end for each way to dilute (rule R5).
func (p packages) finalOf(take quantity.Volume) quantity.Volume {
	switch {
	case p.flags["diluent"] != "":
		return take.Plus(p.volume("diluent"))
	case p.flags["add-to"] != "":
		return take.Plus(p.volume("add-to"))
	case p.flags["replace-in"] != "":
		return p.volume("replace-in")
	}
	return p.volume("make-up-to")
}

func (p packages) body(key string) *big.Rat {
	sex, _ := body.SexNamed(p.flags["sex"])
	size := body.Size{
		Sex: sex, Age: must[body.Age](p)(body.ParseAge(p.flags["age"])),
		Height: must[quantity.Length](p)(quantity.ParseLength(p.flags["height"])),
		Weight: must[quantity.BodyWeight](p)(quantity.ParseBodyWeight(p.flags["weight"])),
	}
	weight, area := must[quantity.BodyWeight](p), must[quantity.BodySurfaceArea](p)
	switch key {
	case "ideal_devine":
		return weight(size.Ideal()).Rat()
	case "adjusted":
		return weight(size.Adjusted()).Rat()
	case "lean_janmahasatian":
		return weight(size.Lean()).Rat()
	case "lean_james":
		return weight(size.James()).Rat()
	case "surface_mosteller":
		return area(size.Mosteller()).Rat()
	case "surface_dubois":
		return area(size.DuBois()).Rat()
	case "bmi":
		return must[*big.Rat](p)(size.BMI())
	}
	p.t.Fatalf("no package route for the body's %q", key)
	return nil
}

// convert works the few kinds of conversion that the vectors hold.
func (p packages) convert() *big.Rat {
	from, to := p.flags["from"], p.flags["to"]
	text := strings.TrimSuffix(strings.TrimSuffix(from, " base"), " salt")
	switch {
	case strings.HasSuffix(from, "lb"):
		w := must[quantity.BodyWeight](p)(quantity.ParseBodyWeight(strings.TrimSuffix(from, "lb") + "kg"))
		return w.Rat().Mul(w.Rat(), big.NewRat(45359237, 100000000))
	case strings.HasPrefix(to, "mL/"):
		return must[quantity.FlowRate](p)(quantity.ParseFlowRate(from)).Rat()
	case p.flags["of"] == "":
		return must[quantity.Concentration](p)(quantity.ParseConcentration(from)).Rat()
	}
	ion, name, ok := strings.Cut(p.flags["of"], " in ")
	if !ok {
		ion, name = "", p.flags["of"]
	}
	s, found := salts.Find(name)
	if !found {
		p.t.Fatalf("no salt %q", name)
	}
	if ion != "" {
		s = must[salts.Salt](p)(s.Counting(ion))
	}
	var a quantity.Amount
	if strings.Contains(text, "%") || strings.Contains(text, "/mL") {
		one := quantity.Millilitres(big.NewRat(1, 1))
		a = must[quantity.Amount](p)(one.Holds(must[quantity.Concentration](p)(quantity.ParseConcentration(text))))
	} else {
		a = must[quantity.Amount](p)(quantity.ParseAmount(text))
	}
	amount := must[quantity.Amount](p)
	switch {
	case strings.HasSuffix(to, " base"):
		return amount(s.ToBase(a)).Rat()
	case strings.HasSuffix(from, " base"):
		return amount(s.ToSalt(a)).Rat()
	case strings.HasPrefix(to, "mmol"):
		return amount(s.Moles(a)).Rat()
	}
	return amount(s.Mass(a)).Rat()
}

// tolerance is row A174: 4 mL read on a 10 mL syringe.
func tolerance(t *testing.T) *big.Rat {
	t.Helper()
	b, ok := syringe.Find(quantity.Millilitres(big.NewRat(10, 1)))
	if !ok {
		t.Fatal("no 10 mL barrel")
	}
	return b.Tolerance(quantity.Millilitres(big.NewRat(4, 1))).Rat()
}
