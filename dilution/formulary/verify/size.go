package verify

import (
	"fmt"
	"math/big"

	"drawup/dilution/body"
	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// A span is a range of plausible figures in mg (units, mmol) or mg/mL.
type span struct{ low, high string }

func rat(s string) *big.Rat {
	r, _ := new(big.Rat).SetString(s)
	return r
}

func (s span) holds(x *big.Rat) bool { return x.Cmp(rat(s.low)) >= 0 && x.Cmp(rat(s.high)) <= 0 }

// A size is what is plausible for the drugs of one label class: strength in mg/mL,
// a dose in mg/kg, a dose rate in mg/kg/h; units or mmol where the drug is counted
// by them. The figures are our own choice: from the published ranges of the class,
// about three times wider at either end.
type size struct{ strength, dose, rate span }

// sizeOf is by class code; where a class holds too much, and where drugs are not
// counted by mass, by ATC group. kin says which: "the class OPI".
func sizeOf(d formulary.Drug) (s size, kin string, ok bool) {
	if s, group := groupSize(d); group != "" || d.Kind != quantity.ByMass {
		return s, "the ATC group " + group, group != ""
	}
	s, ok = classes()[d.Class]
	return s, "the class " + d.Class, ok
}

func classes() map[string]size {
	return map[string]size{
		"IND":   {span{"0.5", "200"}, span{"0.01", "30"}, span{"0.01", "40"}},
		"BZD":   {span{"0.01", "20"}, span{"0.001", "3"}, span{"0.001", "3"}},
		"BZD-A": {span{"0.005", "1"}, span{"0.0003", "0.2"}, span{"0.0003", "0.2"}},
		"NMB":   {span{"0.02", "50"}, span{"0.005", "4"}, span{"0.01", "5"}},
		"SUX":   {span{"0.3", "200"}, span{"0.05", "20"}, span{"0.5", "30"}},
		"NMB-R": {span{"0.1", "500"}, span{"0.003", "50"}, span{"0.001", "50"}},
		"OPI":   {span{"0.001", "200"}, span{"0.00001", "10"}, span{"0.00001", "3"}},
		"OPI-A": {span{"0.001", "3"}, span{"0.0001", "0.3"}, span{"0.0001", "0.1"}},
		"VAS":   {span{"0.0001", "100"}, span{"0.00001", "2"}, span{"0.00001", "10"}},
		"ADR":   {span{"0.0005", "10"}, span{"0.00003", "0.1"}, span{"0.0003", "1"}},
		"HYP":   {span{"0.005", "300"}, span{"0.00001", "10"}, span{"0.0003", "60"}},
		"LA":    {span{"0.2", "60"}, span{"0.01", "30"}, span{"0.01", "10"}},
		"ACH":   {span{"0.003", "60"}, span{"0.0003", "2"}, span{"0.0001", "1"}},
		"AEM":   {span{"0.005", "150"}, span{"0.001", "10"}, span{"0.001", "3"}},
	}
}

// adult is the body of an adult, in kg, for which a figure per kg and an
// absolute one are compared.
const adult = 70

// weightOf is the body, in kg, of those whom a row is for: round figures of our
// own between the ends of its ages.
func weightOf[T any](r formulary.Rule[T]) int64 {
	for _, b := range []struct {
		years  int64
		weight int64
	}{{1, 5}, {6, 14}, {12, 25}, {16, 45}} {
		if r.AgeTo.Given() && !ageOf(b.years).Less(r.AgeTo) {
			return b.weight
		}
	}
	return adult
}

func ageOf(years int64) body.Age {
	a, err := body.ParseAge(fmt.Sprintf("%d years", years))
	if err != nil {
		panic(err) // the four texts above are fixed
	}
	return a
}

// strengths bounds what is in the container by its class.
func (c *check) strengths() {
	s, kin, ok := sizeOf(c.drug)
	if !ok {
		return
	}
	for _, p := range c.drug.Presentations {
		conc, err := p.Amount.In(p.Volume)
		if err == nil && !s.strength.holds(conc.Rat()) {
			c.find(refusal.Implausible, p.Pos, "amount", p.ID, s.strength.low+" to "+s.strength.high+" "+c.unit()+"/mL",
				"%s is far from what drugs of %s come in; is a unit wrong?", p.ID, kin)
		}
	}
}

// bounds holds concentrations against the strengths that the drug comes in:
// nothing can be stronger than the strongest container, but for 1 % where a third
// (400 mg in 3 mL) is rounded outwards, and nobody dilutes more than 2000-fold.
// Between the ends lies a factor of 100 at most.
func (c *check) bounds() {
	for _, b := range c.drug.Bounds {
		strongest := c.strongest(b.Use)
		if strongest == nil {
			continue
		}
		if b.High.Given() && b.High.Value.Rat().Cmp(new(big.Rat).Mul(strongest, big.NewRat(101, 100))) > 0 {
			c.find(refusal.Implausible, b.High.Pos, "high", b.High.Text, "at most the strongest presentation for "+b.Use,
				"the highest concentration for %s, %s, is stronger than any container", b.Use, b.High.Text)
		}
		if b.Low.Given() && new(big.Rat).Mul(b.Low.Value.Rat(), big.NewRat(2000, 1)).Cmp(strongest) < 0 {
			c.find(refusal.Implausible, b.Low.Pos, "low", b.Low.Text, "a 2000th of the strongest presentation or more",
				"the lowest concentration for %s, %s, is a dilution that nobody makes", b.Use, b.Low.Text)
		}
		if b.Low.Given() && b.High.Given() && apart(b.Low.Value.Rat(), b.High.Value.Rat(), 100) {
			c.find(refusal.Implausible, b.Low.Pos, "low", b.Low.Text, "within a factor of 100 of the highest, "+b.High.Text,
				"the ends of the concentrations for %s are too far apart", b.Use)
		}
	}
}

// strongest is the strength of the strongest container for a use, nil when
// none is known.
func (c *check) strongest(use string) *big.Rat {
	var top *big.Rat
	for _, p := range c.drug.Presentations {
		if conc, ok := strength(p); ok && p.For(use) && (top == nil || conc.Rat().Cmp(top) > 0) {
			top = conc.Rat()
		}
	}
	return top
}

// strength is what a container holds per volume; of a powder, in what is added.
func strength(p formulary.Presentation) (quantity.Concentration, bool) {
	conc, err := p.Amount.In(p.Volume)
	if err != nil && p.Powder() && p.Added.Given() {
		conc, err = p.Amount.In(p.Added)
	}
	return conc, err == nil
}

// apart reports that high is more than n times low.
func apart(low, high *big.Rat, n int64) bool {
	return new(big.Rat).Mul(low, big.NewRat(n, 1)).Cmp(high) < 0
}

// A scaled figure is one limit, counted for the body that its row is for.
type scaled struct {
	f     string
	value *big.Rat // mg, or mg/h
	pos   refusal.Pos
}

// doses holds every row of single doses against its class, its containers and
// itself.
func (c *check) doses() {
	s, kin, known := sizeOf(c.drug)
	for _, r := range c.drug.Doses {
		kg := weightOf(r)
		low, high := doseOf(r.UsualLow, kg), doseOf(r.UsualHigh, kg)
		hardLow, soft, hard := doseOf(r.HardLow, kg), doseOf(r.SoftHigh, kg), doseOf(r.HardHigh, kg)
		for _, x := range []scaled{hardLow, low, high, soft, hard} {
			if x.value == nil {
				continue
			}
			if known && !s.dose.holds(perKilogram(x.value, kg)) {
				c.find(refusal.Implausible, x.pos, "dose", x.f, s.dose.low+" to "+s.dose.high+" "+c.unit()+"/kg",
					"the dose of %s for %s is far from those of %s; is a unit wrong?", x.f, r.For, kin)
			}
			c.inContainers(x, r.For)
		}
		c.steps(r.For, hardLow, low, high, soft, hard, gap{usual: 10, hard: 5, signed: 20})
		c.volumes(r, low, high, kg)
		top := scaled{}
		for _, x := range []scaled{high, soft, hard} {
			if x.value != nil {
				top = x
			}
		}
		if r.TotalMax.Given() && top.value != nil && r.TotalMax.Value.Kind() == c.drug.Kind {
			most := scaled{r.TotalMax.Text, r.TotalMax.Value.Rat(), r.TotalMax.Pos}
			if apart(most.value, top.value, 4) || apart(top.value, most.value, 8) {
				c.find(refusal.Implausible, most.pos, "total_max", most.f, "from a quarter to eight times the highest for the body it is for, "+top.f,
					"the absolute maximum of %s for %s and its highest of %s do not fit", most.f, r.For, top.f)
			}
		}
	}
}

func doseOf(f formulary.Figure[quantity.Dose], kg int64) scaled {
	if !f.Given() {
		return scaled{}
	}
	return scaled{f.Text, whole(f.Value.Rat(), f.Value.Basis(), kg), f.Pos}
}

func rateOf(f formulary.Figure[quantity.DoseRate], kg int64) scaled {
	if !f.Given() {
		return scaled{}
	}
	return scaled{f.Text, whole(f.Value.Rat(), f.Value.Basis(), kg), f.Pos}
}

// whole counts a figure for a body of so many kg, and 1.8 m².
func whole(r *big.Rat, b quantity.Basis, kg int64) *big.Rat {
	switch b {
	case quantity.PerKilogram:
		return r.Mul(r, big.NewRat(kg, 1))
	case quantity.PerSquareMetre:
		return r.Mul(r, big.NewRat(9, 5))
	case quantity.Absolute:
	}
	return r
}

// unit is what the drug is counted in, for messages.
func (c *check) unit() string {
	return map[quantity.Kind]string{quantity.ByMass: "mg", quantity.ByActivity: "units", quantity.BySubstance: "mmol"}[c.drug.Kind]
}

func perKilogram(r *big.Rat, kg int64) *big.Rat { return new(big.Rat).Quo(r, big.NewRat(kg, 1)) }

// inContainers wants a dose to be between a five-hundredth of the smallest
// container and thirty of the largest.
func (c *check) inContainers(x scaled, purpose string) {
	var least, most *big.Rat
	for _, p := range c.drug.Presentations {
		a := p.Amount.Rat()
		if p.Amount.Kind() != c.drug.Kind {
			continue
		}
		if least == nil || a.Cmp(least) < 0 {
			least = a
		}
		if most == nil || a.Cmp(most) > 0 {
			most = a
		}
	}
	if least != nil && (apart(x.value, least, 500) || apart(most, x.value, 30)) {
		c.find(refusal.Implausible, x.pos, "dose", x.f, "between a five-hundredth of a container and thirty of them",
			"the dose of %s for %s does not fit the containers; is a unit wrong?", x.f, purpose)
	}
}

// A gap is how far two figures of a row may be apart. A usual range that spans
// more hides a slip of the point; a hard end far above the usual one lets it pass
// unless a soft limit asks for a signature before it.
type gap struct{ usual, hard, signed int64 }

// steps wants neighbouring figures of a row within reach of each other.
func (c *check) steps(purpose string, hardLow, low, high, soft, hard scaled, most gap) {
	beyond := most.hard
	if soft.value != nil {
		beyond = most.signed
	}
	last := func(list ...scaled) scaled {
		out := scaled{}
		for _, x := range list {
			if x.value != nil {
				out = x
			}
		}
		return out
	}
	for _, s := range []struct {
		from, to scaled
		times    int64
	}{{hardLow, low, 10}, {last(hardLow, low), high, most.usual}, {last(low, high), soft, most.hard}, {last(low, high, soft), hard, beyond}} {
		if s.from.value != nil && s.to.value != nil && apart(s.from.value, s.to.value, s.times) {
			c.find(refusal.Implausible, s.to.pos, "row", s.to.f, fmt.Sprintf("within %d times the figure below it, %s", s.times, s.from.f),
				"two figures of the row for %s are too far apart", purpose)
		}
	}
}

// rates holds every row of dose rates against its class, itself, and the flow
// that it makes from the strongest and the weakest mixture.
func (c *check) rates() {
	s, kin, known := sizeOf(c.drug)
	for _, r := range c.drug.Rates {
		kg := weightOf(r)
		low, high := rateOf(r.UsualLow, kg), rateOf(r.UsualHigh, kg)
		hardLow, soft, hard := rateOf(r.HardLow, kg), rateOf(r.SoftHigh, kg), rateOf(r.HardHigh, kg)
		for _, x := range []scaled{hardLow, low, high, soft, hard} {
			if x.value == nil {
				continue
			}
			if known && !s.rate.holds(perKilogram(x.value, kg)) {
				c.find(refusal.Implausible, x.pos, "rate", x.f, s.rate.low+" to "+s.rate.high+" "+c.unit()+"/kg/h",
					"the dose rate of %s for %s is far from those of %s; is a unit wrong?", x.f, r.For, kin)
			}
			c.flows(x, r.For)
		}
		c.steps(r.For, hardLow, low, high, soft, hard, gap{usual: 40, hard: 14, signed: 14})
	}
}

// flows wants a dose rate to run between 0.05 and 2500 mL/h: the fastest that is
// published is the doubled lipid rescue of 30 mL/kg/h, 2100 mL/h at 70 kg.
func (c *check) flows(x scaled, purpose string) {
	for _, b := range c.drug.Bounds {
		if b.Use != "infusion" || !b.Low.Given() || !b.High.Given() {
			continue
		}
		slow := new(big.Rat).Quo(x.value, b.Low.Value.Rat())
		fast := new(big.Rat).Quo(x.value, b.High.Value.Rat())
		if slow.Cmp(big.NewRat(1, 20)) < 0 || fast.Cmp(big.NewRat(2500, 1)) > 0 {
			c.find(refusal.Implausible, x.pos, "rate", x.f, "a flow from 0.05 to 2500 mL/h for 70 kg",
				"the dose rate of %s for %s and the concentrations for infusion do not fit; is a unit wrong?", x.f, purpose)
			return
		}
	}
}
