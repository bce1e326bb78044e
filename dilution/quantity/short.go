package quantity

import "strings"

// shorten is the SHORT rule: exact when four significant digits hold x, else
// half up to three of them, or to a whole number from 1,000 on. A negative x is
// shortened as its size is.
func shorten(x exact) exact {
	if x.sign() < 0 {
		return whole(0).sub(shortenPositive(whole(0).sub(x)))
	}
	return shortenPositive(x)
}

func shortenPositive(x exact) exact {
	if text, ok := x.decimal(); ok && significant(text) <= 4 {
		return x
	}
	step := whole(1)
	if x.cmp(whole(1000)) < 0 {
		for x.cmp(step.mul(whole(100))) < 0 {
			step = step.quo(whole(10))
		}
	}
	r, err := x.toStep(step, HalfUp)
	if err != nil {
		return exact{}
	}
	return r
}

// significant counts the digits of a decimal text, not negative, that carry
// meaning.
func significant(text string) int {
	digits := strings.TrimLeft(strings.Replace(text, ".", "", 1), "0")
	if !strings.Contains(text, ".") {
		digits = strings.TrimRight(digits, "0")
	}
	return len(digits)
}

// Best is the unit in which paper shows a: the largest that makes the number at
// least 1. An amount of nothing keeps its own unit.
func (a Amount) Best() Unit {
	if !a.x.positive() {
		return a.unit
	}
	if a.kind == ByMass {
		return largest(a.x, Gram(), Milligram(), Microgram(), Nanogram())
	}
	return bestCount(a.x, a.kind)
}

// Best is the unit in which paper shows c per mL: the largest that makes the
// number at least 1, but never the gram.
func (c Concentration) Best() Unit {
	if c.kind == ByMass {
		return largest(c.x, Milligram(), Microgram(), Nanogram())
	}
	return bestCount(c.x, c.kind)
}

// bestCount is the unit for what is not counted by mass. Activity stays in
// units, whatever their number.
func bestCount(x exact, k Kind) Unit {
	switch k {
	case ByActivity:
		return Units()
	case BySubstance:
		// Electrolytes are prescribed in mmol: 400 micromol/mL beside mmol/h would
		// invite a thousandfold slip. Below a hundredth the noughts would.
		if x.mul(whole(100)).cmp(Millimole().scale) >= 0 {
			return Millimole()
		}
		return Micromole()
	}
	return Unit{}
}

// largest is the first of the units, large to small, that x fills; else the
// last.
func largest(x exact, units ...Unit) Unit {
	for _, u := range units {
		if x.cmp(u.scale) >= 0 {
			return u
		}
	}
	return units[len(units)-1]
}

// InCode is c as the barcode carries it: no blank, ASCII units (mg, ug, ng,
// unit, mmol, umol), per mL, by the SHORT rule; "" if nothing is given.
func (c Concentration) InCode() string {
	if !c.Given() {
		return ""
	}
	u := c.Best()
	return shorten(in(c.x, c.kind, u)).text() + u.codeWord() + "/mL"
}

// InCode is a as the barcode carries it: no blank, ASCII units (g, mg, ug, ng,
// unit, mmol, umol), by the SHORT rule; "" if nothing is given.
func (a Amount) InCode() string {
	if !a.Given() {
		return ""
	}
	u := a.Best()
	return shorten(in(a.x, a.kind, u)).text() + u.codeWord()
}

// codeWord is the unit in signs that a barcode may hold.
func (u Unit) codeWord() string {
	switch u.word {
	case "microgram":
		return "ug"
	case "nanogram":
		return "ng"
	case "micromol":
		return "umol"
	}
	return u.word
}
