package main

import (
	"math/big"
	"strings"
	"testing"

	"drawup/dilution"
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
		case "total":
			return p.total()
		case "flow":
			return p.flow(key)
		case "accuracy":
			return p.accuracy(key)
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
	case p.flags["each"] != "":
		each := must[quantity.DoseRate](p)(quantity.ParseDoseRate(p.flags["each"]))
		final = quantity.Millilitres(big.NewRat(50, 1)) // the rule of three
		a = must[quantity.Amount](p)(dilution.WeightMade(each, p.weight("weight"), final))
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

func (p packages) weight(flag string) quantity.BodyWeight {
	return must[quantity.BodyWeight](p)(quantity.ParseAnyBodyWeight(p.flags[flag]))
}

func (p packages) duration() quantity.Duration {
	return must[quantity.Duration](p)(quantity.ParseDuration(p.flags["time"]))
}

func (p packages) total() *big.Rat {
	rate := must[quantity.DoseRate](p)(quantity.ParseDoseRate(p.flags["rate"]))
	sum := must[quantity.Dose](p)(rate.During(p.duration()))
	if text, ok := p.flags["load"]; ok {
		sum = must[quantity.Dose](p)(must[quantity.Dose](p)(quantity.ParseDose(text)).Plus(sum))
	}
	return sum.Rat()
}

func (p packages) flow(key string) *big.Rat {
	if text, ok := p.flags["rate"]; ok {
		perKg := must[quantity.FlowPerKilogram](p)(quantity.ParseFlowPerKilogram(text))
		return must[quantity.FlowRate](p)(perKg.For(p.weight("weight"))).Rat()
	}
	f := must[quantity.FlowRate](p)(p.volume("volume").Over(p.duration()))
	if key == "flow_rate" {
		return f.Rat()
	}
	set := must[quantity.DropFactor](p)(quantity.ParseDropFactor(p.flags["set"]))
	drops := must[quantity.DropRate](p)(f.Drops(set)).Rat()
	return drops.Mul(drops, big.NewRat(60, 1)) // in an hour, as the unit table counts
}

func (p packages) accuracy(key string) *big.Rat {
	switch key {
	case "tolerance":
		b, ok := syringe.Find(p.volume("barrel"))
		if !ok {
			p.t.Fatal("no such barrel")
		}
		return b.Tolerance(p.volume("reading")).Rat()
	case "relative":
		v := p.volume("labelled")
		excess := must[quantity.Volume](p)(dilution.Overfill(v, dilution.Mobile))
		return excess.Rat().Mul(excess.Rat(), new(big.Rat).Quo(big.NewRat(100, 1), v.Rat()))
	}
	var widths []syringe.Width
	for _, percent := range []*big.Rat{big.NewRat(12, 100), big.NewRat(18, 100), big.NewRat(84, 1000)} { // of 50 mL
		widths = append(widths, syringe.Width{Percent: quantity.PerCent(percent), Shape: syringe.Rectangular})
	}
	u := must[syringe.Uncertainty](p)(syringe.Combine(widths...)).Standard.Rat()
	return u.Mul(u, big.NewRat(1, 2)) // 50 mL in hundredths
}

func (p packages) body(key string) *big.Rat {
	switch {
	case p.flags["estimate"] != "":
		rule, _ := body.AgeRuleNamed(p.flags["estimate"])
		return must[body.Estimate](p)(rule.Guess(must[body.Age](p)(body.ParseAge(p.flags["age"])))).Weight.Rat()
	case p.flags["ideal"] != "":
		size := body.Size{Weight: p.weight("weight")}
		return must[quantity.BodyWeight](p)(size.AdjustedFrom(p.weight("ideal"))).Rat()
	}
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
	case "lean_boer":
		return weight(size.Boer()).Rat()
	case "ideal_child":
		return weight(size.ChildIdeal()).Rat()
	case "surface_mosteller":
		return area(size.Mosteller()).Rat()
	case "surface_dubois":
		return area(size.DuBois()).Rat()
	case "surface_haycock":
		return area(size.Surface(body.Haycock)).Rat()
	case "surface_boyd":
		return area(size.Surface(body.Boyd)).Rat()
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
	case to == "kg":
		return must[quantity.BodyWeight](p)(quantity.ParseAnyBodyWeight(from)).Rat()
	case to == "cm":
		return must[quantity.Length](p)(quantity.ParseAnyLength(from)).Rat()
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
