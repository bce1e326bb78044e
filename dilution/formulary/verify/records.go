package verify

import (
	"math/big"
	"slices"
	"strings"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// routes are those that a record may name; a word that is none of them is
// misspelt, or a reason to widen the list.
var routes = []string{"IV", "IM", "SC", "intradermal", "intraosseous", "intra-arterial", "epidural", "caudal", "intrathecal", "nerve block",
	"infiltration", "IV regional", "peribulbar", "intra-articular", "intraperitoneal", "intrapleural", "inhaled", "intranasal", "rectal"}

// words wants routes that are ones, lines that are ones, each fluid once and
// either allowed or forbidden, and a drug that may be given at all.
func (c *check) words() {
	d := c.drug
	if d.NeverAsBolus != nil && d.NeverAsInfusion != nil {
		c.find(refusal.KeyConflict, d.Pos, "never_as_bolus", d.NeverAsBolus.Text, "one of the two bans", "neither a bolus nor an infusion is allowed")
	}
	for _, p := range d.Presentations {
		c.routes(p.Routes, p.Pos)
		seen := map[string]bool{}
		for _, x := range slices.Concat(p.Diluents, p.Forbidden) {
			if name := strings.ToLower(x.Name); seen[name] {
				c.find(refusal.KeyRepeated, x.Pos, "diluent", x.Name, "each fluid once, allowed or forbidden", "%s: %s stands twice among the fluids", p.ID, x.Name)
			} else {
				seen[name] = true
			}
		}
	}
	for _, b := range d.Bounds {
		c.routes(b.Routes, b.Pos)
	}
	for _, r := range d.Doses {
		c.routes(r.Routes, r.Pos)
	}
	for _, r := range d.Rates {
		c.routes(r.Routes, r.Pos)
	}
	for _, s := range d.Standards {
		if !slices.Contains([]string{"any", "peripheral", "central"}, s.Line) || !slices.Contains([]string{"", "adults", "children", "newborns"}, s.Patients) {
			c.find(refusal.ValueUnknown, s.Pos, "standard", s.Line+", "+s.Patients, "line any, peripheral or central; patients adults, children or newborns",
				"the standard preparation %s does not say for which line or whom it is", s.ID)
		}
	}
}

func (c *check) routes(list []string, pos refusal.Pos) {
	for _, r := range list {
		if !slices.Contains(routes, r) {
			c.find(refusal.ValueUnknown, pos, "routes", r, strings.Join(routes, ", "), "%q is no route", r)
		}
	}
}

// kinds wants every figure to be counted as the drug is: by mass, in units or by
// amount of substance. Nothing converts one into another but the drug's own factor.
func (c *check) kinds() {
	of := func(k quantity.Kind, given bool, text string, pos refusal.Pos) {
		if given && k != c.drug.Kind {
			c.find(refusal.AmountKindDiffer, pos, "value", text, "a figure counted by "+c.drug.Kind.String(),
				"%s is counted by %v, and the drug by %v", text, k, c.drug.Kind)
		}
	}
	concentration := func(f formulary.Figure[quantity.Concentration]) { of(f.Value.Kind(), f.Given(), f.Text, f.Pos) }
	dose := func(list ...formulary.Figure[quantity.Dose]) {
		for _, f := range list {
			of(f.Value.Kind(), f.Given(), f.Text, f.Pos)
		}
	}
	d := c.drug
	for _, p := range d.Presentations {
		for _, x := range slices.Concat(p.Diluents, p.Forbidden) {
			concentration(x.Low)
			concentration(x.High)
		}
	}
	for _, b := range d.Bounds {
		concentration(b.Low)
		concentration(b.High)
	}
	for _, r := range d.Doses {
		dose(r.HardLow, r.UsualLow, r.UsualHigh, r.SoftHigh, r.HardHigh, r.FirstMax, r.RepeatMax, r.DayMax, r.CourseMax)
		of(r.TotalMax.Value.Kind(), r.TotalMax.Given(), r.TotalMax.Text, r.TotalMax.Pos)
	}
	for _, r := range d.Rates {
		for _, f := range []formulary.Figure[quantity.DoseRate]{r.HardLow, r.UsualLow, r.UsualHigh, r.SoftHigh, r.HardHigh} {
			of(f.Value.Kind(), f.Given(), f.Text, f.Pos)
		}
		dose(r.CourseMax)
	}
	for _, m := range d.LocalMaxima {
		dose(m.PerKg, m.DayMax)
	}
	for _, s := range d.Standards {
		of(s.Amount.Kind(), s.Amount.Given(), s.Mix, s.Pos)
	}
	for _, s := range d.Stability {
		concentration(s.Low)
		concentration(s.High)
	}
}

// pairs holds each mixture of two drugs against both: bounds in order, counted as
// the drug is, and not above its strongest container.
func pairs(f *formulary.Formulary) refusal.List {
	var out refusal.List
	for _, m := range f.Mixes {
		for _, b := range m.Bounds {
			d, _, ok := f.Find(b.Drug)
			if !ok {
				continue // the reader has refused it
			}
			c := &check{drug: d}
			c.mixBound(b)
			out = append(out, c.found...)
		}
		if life := m.Life; life.Given() {
			c := &check{drug: formulary.Drug{Name: strings.Join(m.Drugs[:], " with "), Pos: m.Pos}}
			c.time(life.Value, life.Text, shortestKept, longestKept, life.Pos, "life", "a time in use")
			out = append(out, c.found...)
		}
	}
	return out
}

func (c *check) mixBound(b formulary.MixBound) {
	top := c.strongest("infusion")
	if x := c.strongest("bolus"); top == nil || x != nil && x.Cmp(top) > 0 {
		top = x
	}
	for _, x := range []formulary.Figure[quantity.Concentration]{b.Low, b.High} {
		if x.Given() && x.Value.Kind() != c.drug.Kind {
			c.find(refusal.AmountKindDiffer, x.Pos, "bound", x.Text, "a figure counted by "+c.drug.Kind.String(),
				"%s of the mixture is not counted as the drug is", x.Text)
			return
		}
		if x.Given() && top != nil && x.Value.Rat().Cmp(top) > 0 {
			c.find(refusal.Implausible, x.Pos, "bound", x.Text, "at most the strongest presentation",
				"%s in the mixture is stronger than any container", x.Text)
		}
	}
	if b.Low.Given() && b.High.Given() && (b.Low.Value.Rat().Cmp(b.High.Value.Rat()) > 0 || new(big.Rat).Mul(b.Low.Value.Rat(), big.NewRat(100, 1)).Cmp(b.High.Value.Rat()) < 0) {
		c.find(refusal.KeyConflict, b.Low.Pos, "bound", b.Low.Text+" to "+b.High.Text, "low not above high, nor a hundredth of it",
			"the bounds of the mixture do not make a range")
	}
}
