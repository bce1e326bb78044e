package main

import (
	"errors"
	"fmt"
	"strings"

	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/dilution/salts"
)

// findSalt reads "NAME" or "ION in NAME".
func (c *conversion) findSalt(of string) bool {
	name, ion := strings.TrimSpace(of), ""
	if head, tail, ok := strings.Cut(name, " in "); ok {
		ion, name = strings.TrimSpace(head), strings.TrimSpace(tail)
	}
	s, ok := salts.Find(name)
	if !ok {
		c.refuse(refusal.ValueUnknown, "--of", name, "a named salt", fmt.Sprintf("--of: got %q, want a salt with its water named", name),
			nearestOr(name, salts.Names(), "", "the names are: "+strings.Join(salts.Names(), "; ")))
		return false
	}
	if ion != "" {
		var err error
		if s, err = s.Counting(ion); err != nil {
			c.refuse(refusal.ValueUnknown, "--of", ion, "an ion of the salt", err.Error(), "its ions are: "+ionNames(s))
			return false
		}
	}
	c.salt, c.ok = s, true
	return true
}

func ionNames(s salts.Salt) string {
	var out []string
	for _, i := range s.Ions() {
		out = append(out, i.Name)
	}
	return strings.Join(out, "; ")
}

// throughSalt joins mass, amount of substance and base by way of the mass of
// the named salt.
func (c *conversion) throughSalt(got, one reading, fromForm, toForm, to string) {
	if !c.joinable(got, one) {
		return
	}
	mass, err := c.saltMass(quantityOf(got), fromForm)
	if err == nil {
		mass, err = c.fromSaltMass(mass, one.kind, toForm)
	}
	if err != nil {
		c.saltFault(err)
		return
	}
	c.sayHow(fromForm == "base" || toForm == "base")
	c.answer(mass.Rat(), one, to)
}

// joinable refuses what no factor joins: units of activity, and anything whose
// salt is not named.
func (c *conversion) joinable(got, one reading) bool {
	switch got.shape {
	case shapeAmount, shapeConcentration, shapeDose, shapeDoseRate:
	default:
		c.r.add(faultOf("--from", &quantity.KindError{Got: got.kind, Want: one.kind}))
		return false
	}
	if got.kind == quantity.ByActivity || one.kind == quantity.ByActivity {
		c.refuse(refusal.AmountKindDiffer, "--from", c.doc.From, one.kind.String(),
			"units of biological activity are each drug's own; no factor joins them to mass or mmol",
			"look for both figures on the pack in the hand")
		return false
	}
	if !c.ok {
		c.refuse(refusal.AmountKindDiffer, "--from", c.doc.From, one.kind.String(),
			fmt.Sprintf("%v becomes %v only for a named salt", got.kind, one.kind),
			`add --of "magnesium sulfate heptahydrate", with the water that the label names`)
		return false
	}
	return true
}

// quantityOf is the amount of drug of a reading; of a concentration, the amount
// in 1 mL.
func quantityOf(x reading) quantity.Amount {
	switch x.kind {
	case quantity.ByMass:
		return quantity.AmountOf(x.value, quantity.Milligram())
	case quantity.BySubstance:
		return quantity.AmountOf(x.value, quantity.Millimole())
	case quantity.ByActivity:
		return quantity.AmountOf(x.value, quantity.Units())
	}
	return quantity.Amount{}
}

func (c *conversion) saltMass(a quantity.Amount, word string) (quantity.Amount, error) {
	switch {
	case word == "base":
		return c.salt.ToSalt(a)
	case a.Kind() == quantity.BySubstance:
		return c.salt.Mass(a)
	}
	return a, nil
}

func (c *conversion) fromSaltMass(a quantity.Amount, want quantity.Kind, word string) (quantity.Amount, error) {
	switch {
	case word == "base" && want != quantity.ByMass:
		return quantity.Amount{}, &quantity.KindError{Got: want, Want: quantity.ByMass}
	case word == "base":
		return c.salt.ToBase(a)
	case want == quantity.BySubstance:
		return c.salt.Moles(a)
	}
	return a, nil
}

func (c *conversion) saltFault(err error) {
	var fault *salts.Error
	if errors.As(err, &fault) {
		c.refuse(refusal.ValueUnknown, "--of", fault.Salt, "", err.Error(), "check the name of the salt")
		return
	}
	c.r.add(faultOf("--from", err))
}

// milliequivalents reads "8 mEq", "1.97 mEq/mL", "1 mEq/kg", "10 mEq/h": as the
// same in mmol, for the charge to be counted out.
func milliequivalents(text string) (reading, bool) {
	asMoles := strings.Replace(text, "mEq", "mmol", 1)
	if asMoles == text {
		return reading{}, false
	}
	got, ok := readAny(asMoles)
	return got, ok && got.kind == quantity.BySubstance
}

// fromCharge turns milliequivalents into the unit of one, by the charge of the
// named salt or ion.
func (c *conversion) fromCharge(charge, one reading, toForm, to string) {
	if charge.shape != one.shape {
		c.refuse(refusal.UnitWrongKind, "--to", to, "mmol, mg, mmol/mL or mg/mL",
			"milliequivalents become mmol or mg, counted per the same on both sides", "check both units")
		return
	}
	if charge.basis != one.basis {
		c.r.add(faultOf("--to", &quantity.BasisError{Got: one.basis, Want: charge.basis}))
		return
	}
	if !c.ok {
		c.refuse(refusal.AmountKindDiffer, "--from", c.doc.From, "a named salt", "milliequivalents mean nothing until the salt or ion is named",
			`add --of "potassium chloride"`)
		return
	}
	a, err := c.salt.OfCharge(charge.value)
	if err == nil && one.kind != quantity.BySubstance {
		if a, err = c.salt.Mass(a); err == nil {
			a, err = c.fromSaltMass(a, one.kind, toForm)
		}
	}
	if err == nil && a.Kind() != one.kind {
		err = &quantity.KindError{Got: a.Kind(), Want: one.kind}
	}
	if err != nil {
		c.saltFault(err)
		return
	}
	c.sayHow(toForm == "base")
	c.answer(a.Rat(), one, to)
}

// sayHow writes the masses behind a conversion and where they come from.
func (c *conversion) sayHow(base bool) {
	s := c.salt
	say := func(format string, args ...any) { c.doc.Working = append(c.doc.Working, fmt.Sprintf(format, args...)) }
	say("%s %s: %s g/mol", s.Name(), s.Formula(), exactText(s.GramsPerMole()))
	if base {
		say("%s %s: %s g/mol", s.Base(), s.BaseFormula(), exactText(s.BaseGramsPerMole()))
	} else {
		say("mmol count %s", s.Counted())
	}
	say("atomic weights: %s", salts.AtomicWeights)
	if s.Checked() != "" {
		say("agrees with %s", s.Checked())
		return
	}
	c.r.caution(refusal.Reason{
		Code: refusal.Unverified, Field: "--of", Got: s.Name(), Rule: "R13", Source: salts.AtomicWeights,
		Message: "the formula of " + s.Name() + " (" + s.Formula() + ") is written from general knowledge and was not compared with a label",
		Remedy:  "compare the result with the label of the presentation in the hand",
	})
}
