package verify

import (
	"math/big"
	"regexp"
	"slices"
	"strings"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/dilution/salts"
)

// names wants each identifier to say what the container holds: an order names
// it, and a person reads it off the pack.
func (c *check) names() {
	ids := map[string]bool{}
	for _, p := range c.drug.Presentations {
		if ids[strings.ToLower(p.ID)] {
			c.find(refusal.KeyRepeated, p.Pos, "id", p.ID, "one presentation for each id", "the id %q stands twice", p.ID)
		}
		ids[strings.ToLower(p.ID)] = true
	}
}

// inside takes an identifier apart: "multi-dose vial 1 g with 5 mg in 20 mL, preservative-free".
var inside = regexp.MustCompile(`^(?:multi-dose )?([a-z]+) ([0-9.]+ [a-z]+)(?: with ([0-9.]+ [a-z]+))?(?: in ([0-9.]+ m?L))?(?:[,; (].*)?$`)

// contents holds amount and volume against the identifier.
func (c *check) contents() {
	for _, p := range c.drug.Presentations {
		m := inside.FindStringSubmatch(p.ID)
		if m == nil {
			c.find(refusal.ContentsUnlike, p.Pos, "id", p.ID, `container, amount and volume, as in "ampoule 20 mg in 10 mL"`,
				"the id %q does not say what is in the container", p.ID)
			continue
		}
		a, errA := quantity.ParseAmount(m[2])
		if errA != nil || !a.Equal(p.Amount) || m[1] != p.Container {
			c.find(refusal.ContentsUnlike, p.Pos, "amount", p.Amount.Written(), m[2],
				"the id %q and the contents, %s of %s, do not agree", p.ID, p.Container, p.Amount.Written())
		}
		if m[3] != "" || p.SecondName != "" {
			b, err := quantity.ParseAmount(m[3])
			if err != nil || !b.Equal(p.SecondAmount) {
				c.find(refusal.ContentsUnlike, p.Pos, "second_amount", p.SecondAmount.Written(), m[3],
					"the id %q and the second drug, %s, do not agree", p.ID, p.SecondAmount.Written())
			}
		}
		if (m[4] == "") != p.Powder() {
			c.find(refusal.ContentsUnlike, p.Pos, "form", p.Form, "a volume in the id of a solution, none in that of a powder",
				"the id %q and the form, %s, do not agree", p.ID, p.Form)
		} else if !p.Powder() {
			v, err := quantity.ParseVolume(m[4])
			if err != nil || v.Cmp(p.Volume) != 0 {
				c.find(refusal.ContentsUnlike, p.Pos, "volume", p.Volume.Written(), m[4],
					"the id %q and the volume, %s, do not agree", p.ID, p.Volume.Written())
			}
		}
	}
}

// powders bounds what a powder takes: less than the fluid added to it, and
// about as much as its own mass. 2 mL for each gram is more than any substance
// of the kind, a quarter is less; most take 0.5 to 1 mL for each gram. A container
// holds a hundredth to three tenths more than it says (our own choices).
func (c *check) powders() {
	for _, p := range c.drug.Presentations {
		if nominal := firstGiven(p.Volume, p.Added); p.Overfill.Given() && nominal.Given() &&
			(apart(p.Overfill.Value.Rat(), nominal.Rat(), 100) || p.Overfill.Value.Rat().Cmp(new(big.Rat).Mul(nominal.Rat(), big.NewRat(3, 10))) > 0) {
			c.find(refusal.Implausible, p.Overfill.Pos, "overfill", p.Overfill.Text, "from a hundredth to three tenths of "+nominal.Written(), "%s: no container is overfilled like that", p.ID)
		}
		v := p.Displacement
		if !p.Powder() || !v.Given() || !v.Value.Given() {
			continue
		}
		if v.Value.Cmp(p.Added) >= 0 {
			c.find(refusal.Implausible, v.Pos, "displacement", v.Text, "less than the fluid added, "+p.Added.Written(), "%s: the powder takes more volume than the fluid", p.ID)
		}
		if p.Amount.Kind() == quantity.ByMass {
			grams := new(big.Rat).Quo(p.Amount.Rat(), big.NewRat(1000, 1))
			if grams.Cmp(big.NewRat(1, 10)) >= 0 && apart(v.Value.Rat(), grams, 4) {
				c.find(refusal.Implausible, v.Pos, "displacement", v.Text, "at least a quarter of a mL for each gram", "%s: the powder takes less volume than any of its mass", p.ID)
			}
			if v.Value.Rat().Cmp(grams.Mul(grams, big.NewRat(2, 1))) > 0 && v.Value.Rat().Cmp(big.NewRat(1, 2)) > 0 {
				c.find(refusal.Implausible, v.Pos, "displacement", v.Text, "at most 2 mL for each gram", "%s: the powder takes more volume than any of its mass", p.ID)
			}
		}
	}
}

func firstGiven(volumes ...quantity.Volume) quantity.Volume {
	for _, v := range volumes {
		if v.Given() {
			return v
		}
	}
	return quantity.Volume{}
}

// assays bounds the half width of the assay limits: pharmacopoeias give 5 to 15 %,
// for a few substances less (our own choice: 2 to 20).
func (c *check) assays() {
	for _, p := range c.drug.Presentations {
		if x := p.Assay; x.Given() && !(span{"2", "20"}).holds(x.Value.Rat()) {
			c.find(refusal.Implausible, x.Pos, "assay", x.Text, "2 to 20 %", "%s: no pharmacopoeia has assay limits like that", p.ID)
		}
	}
}

// factors holds the factors of salts and of amount of substance against molar
// masses: they may be off by 2 %, the rounding of labels.
func (c *check) factors() {
	d := c.drug
	if d.Formula == "" {
		if d.Substance.Given() {
			c.find(refusal.KeyMissing, d.Substance.Pos, "formula", "", "the chemical formula of what is counted", "the factor cannot be held against a molar mass without a formula")
		}
		return
	}
	m, err := salts.MolarMass(d.Formula)
	if err != nil {
		c.find(refusal.ValueUnknown, d.Pos, "formula", d.Formula, "a formula such as MgSO4.7H2O", "%v", err)
		return
	}
	if d.Substance.Given() {
		want := new(big.Rat).Quo(big.NewRat(1000*d.IonsPerFormula, 1), m)
		c.factor(d.Substance.Pos, "substance", d.Substance.Text, d.Substance.Value.PerGram.Rat(), want, "mmol in a gram")
	}
	if d.Salt == nil || d.Salt.Formula == "" {
		return
	}
	s, err := salts.MolarMass(d.Salt.Formula)
	if err != nil {
		c.find(refusal.ValueUnknown, d.Salt.Pos, "salt.formula", d.Salt.Formula, "a formula such as C8H11NO3.C4H6O6.H2O", "%v", err)
		return
	}
	want := new(big.Rat).Quo(s, m.Mul(m, big.NewRat(d.Salt.Holds, 1)))
	c.factor(d.Salt.Pos, "salt", d.Salt.PerMg.Written(), d.Salt.PerMg.Rat(), want, "mg of salt for each mg as counted")
}

func (c *check) factor(pos refusal.Pos, field, got string, have, want *big.Rat, what string) {
	off := new(big.Rat).Sub(have, want)
	off.Abs(off).Quo(off, want)
	if off.Cmp(big.NewRat(2, 100)) > 0 {
		c.find(refusal.FactorOff, pos, field, got, "within 2 % of "+want.FloatString(3),
			"the factor is %s, and the molar masses give %s %s", got, want.FloatString(3), what)
	}
}

// standards wants each standard preparation inside the bounds of its line, with
// a diluent that some presentation allows.
func (c *check) standards() {
	d := c.drug
	for _, s := range d.Standards {
		conc, err := s.Amount.In(s.Volume)
		if err != nil {
			continue // the reader has refused it
		}
		if a, v, err := quantity.ParseMix(s.ID); err != nil || !a.Equal(s.Amount) || v.Cmp(s.Volume) != 0 {
			c.find(refusal.ContentsUnlike, s.Pos, "mix", s.Mix, "what the id says, as in \"4 mg in 50 mL\"",
				"the id %q and the mixture, %s, do not agree", s.ID, s.Mix)
		}
		if !slices.ContainsFunc(d.Bounds, func(b formulary.Bounds) bool {
			low, e1 := conc.Cmp(b.Low.Value)
			high, e2 := conc.Cmp(b.High.Value)
			return b.Use == "infusion" && (b.Line == "any" || b.Line == s.Line || s.Line == "any") && e1 == nil && e2 == nil && low >= 0 && high <= 0
		}) {
			c.find(refusal.StandardOutside, s.Pos, "standard", s.ID, "a concentration inside the bounds for its line",
				"the standard preparation %s is outside every bound for infusions into a %s line", s.ID, s.Line)
		}
		if !c.makeable(s, conc) {
			c.find(refusal.StandardDiluent, s.Pos, "diluent", s.Diluent, "a diluent that a presentation for infusion allows, and one as strong; undiluted, of the same strength",
				"no presentation for infusion may be made up as %s, %s", s.ID, diluentWord(s.Diluent))
		}
	}
}

func diluentWord(name string) string {
	if name == "" {
		return "undiluted"
	}
	return "in " + name
}

// makeable reports a presentation that is diluted so, or, undiluted, is as strong as
// the mixture: a blank that was meant as a diluent does not pass as none.
func (c *check) makeable(s formulary.Standard, conc quantity.Concentration) bool {
	return slices.ContainsFunc(c.drug.Presentations, func(p formulary.Presentation) bool {
		own, ok := strength(p)
		if !ok || !p.For("infusion") {
			return false
		}
		n, err := own.Cmp(conc)
		if s.Diluent == "" {
			return p.Neat && err == nil && n == 0
		}
		return err == nil && n >= 0 && slices.ContainsFunc(p.Diluents, func(d formulary.Diluent) bool { return d.Name == s.Diluent })
	})
}
