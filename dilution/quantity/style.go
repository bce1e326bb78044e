package quantity

import (
	"math/big"
	"strings"
)

// A Style is one house style of numbers and units on paper (rule R14;
// label-rules.md 3.2). The zero value is no style and prints nothing.
type Style struct{ name string }

// House styles.
func UK() Style { return Style{"uk"} } // microgram in full, comma groups
func US() Style { return Style{"us"} } // mcg, comma groups
func SI() Style { return Style{"si"} } // microgram in full, no-break blank groups

// StyleNamed finds a style by its name: uk, us, si.
func StyleNamed(s string) (Style, bool) {
	switch s {
	case "uk", "us", "si":
		return Style{s}, true
	}
	return Style{}, false
}

// String is the style's name.
func (s Style) String() string { return s.name }

// group puts separators into a plain decimal text, from 1,000 on (rule N09).
func (s Style) group(text string) string {
	head, tail, point := strings.Cut(text, ".")
	sep := ","
	if s.name == "si" {
		sep = "\u00a0"
	}
	var b strings.Builder
	for i, d := range head {
		if i > 0 && (len(head)-i)%3 == 0 {
			b.WriteString(sep)
		}
		b.WriteRune(d)
	}
	if point {
		b.WriteString("." + tail)
	}
	return b.String()
}

// word is the unit as this style writes it beside the number x.
func (s Style) word(u Unit, x exact) string {
	w := u.word
	if s.name == "us" && w == "microgram" {
		return "mcg"
	}
	switch w {
	case "microgram", "nanogram", "unit", "milliunit":
		if x.cmp(whole(1)) > 0 {
			return w + "s"
		}
	}
	return w
}

// significant counts the digits of a decimal text that carry meaning.
func significant(text string) int {
	digits := strings.TrimLeft(strings.Replace(text, ".", "", 1), "0")
	if !strings.Contains(text, ".") {
		digits = strings.TrimRight(digits, "0")
	}
	return len(digits)
}

// shorten is the SHORT rule: exact when at most four significant digits are
// needed, else half up to three of them, or to a whole number from 1,000 on.
func shorten(x exact) (exact, bool) {
	if text, ok := x.decimal(); ok && (significant(text) <= 4 || x.sign() == 0) {
		return x, true
	}
	step := whole(1)
	if x.cmp(whole(1000)) < 0 {
		step = whole(1)
		for x.cmp(step.mul(whole(100))) < 0 {
			step = step.quo(whole(10))
		}
		for x.cmp(step.mul(whole(1000))) >= 0 {
			step = step.mul(whole(10))
		}
	}
	r, _ := x.toStep(step, HalfUp)
	return r, r.cmp(x) == 0
}

func (s Style) short(x exact) (exact, string, bool) {
	y, same := shorten(x)
	text, _ := y.decimal()
	return y, s.group(text), same
}

// pickUnit chooses the unit that makes the number at least 1 (rule N16).
func pickUnit(x exact, k Kind, units ...Unit) Unit {
	for _, u := range units {
		if x.cmp(u.scale) >= 0 {
			return u
		}
	}
	return units[len(units)-1]
}

func amountUnit(x exact, k Kind) Unit {
	switch k {
	case ByMass:
		return pickUnit(x, k, Gram(), Milligram(), Microgram(), Nanogram())
	case ByActivity:
		return Units()
	case BySubstance:
		return pickUnit(x, k, Millimole(), Micromole())
	}
	return Unit{}
}

func concentrationUnit(x exact, k Kind) Unit {
	if k == ByMass {
		return pickUnit(x, k, Milligram(), Microgram(), Nanogram())
	}
	return amountUnit(x, k)
}

// Best is the unit in which paper shows a.
func (a Amount) Best() Unit {
	if a.IsZero() {
		return a.unit
	}
	return amountUnit(a.x, a.kind)
}

// Best is the unit in which paper shows c, per mL.
func (c Concentration) Best() Unit { return concentrationUnit(c.x, c.kind) }

// Amount is a in the unit that suits it, by the SHORT rule.
func (s Style) Amount(a Amount) string {
	if !a.Given() {
		return ""
	}
	return s.AmountIn(a, a.Best())
}

// AmountIn is a in unit u, by the SHORT rule.
func (s Style) AmountIn(a Amount, u Unit) string {
	y, text, _ := s.short(a.x.quo(u.scale))
	return text + " " + s.word(u, y)
}

// Concentration is c per mL, by the SHORT rule (rule N19).
func (s Style) Concentration(c Concentration) string {
	if !c.Given() {
		return ""
	}
	return s.ConcentrationIn(c, c.Best())
}

// ConcentrationIn is c per mL in unit u, by the SHORT rule.
func (s Style) ConcentrationIn(c Concentration, u Unit) string {
	y, text, _ := s.short(c.x.quo(u.scale))
	return text + " " + s.word(u, y) + "/mL"
}

// Volume is v in mL. What a scale or a pump can show, two decimals or fewer,
// is printed exactly; anything else by the SHORT rule.
func (s Style) Volume(v Volume) string {
	if !v.Given() {
		return ""
	}
	return s.shown(v.x) + " mL"
}

// shown is x exactly when two decimals are enough, else by the SHORT rule.
func (s Style) shown(x exact) string {
	if places, ok := x.places(); ok && places <= 2 {
		text, _ := x.decimal()
		return s.group(text)
	}
	_, text, _ := s.short(x)
	return text
}

// Dose is d in its own unit.
func (s Style) Dose(d Dose) string {
	if !d.Given() {
		return ""
	}
	y, text, _ := s.short(d.x.quo(d.unit.scale))
	return text + " " + s.word(d.unit, y) + basisTail(d.basis)
}

func basisTail(b Basis) string {
	switch b {
	case PerKilogram:
		return "/kg"
	case PerSquareMetre:
		return "/m²"
	}
	return ""
}

// DoseRate is d in its own unit and period, by the SHORT rule.
func (s Style) DoseRate(d DoseRate) string {
	if !d.Given() {
		return ""
	}
	y, text, _ := s.short(d.inOwnUnit())
	return text + " " + s.word(d.unit, y) + basisTail(d.basis) + "/" + d.period.String()
}

// FlowRate is f in mL/h, written as a volume is.
func (s Style) FlowRate(f FlowRate) string {
	if !f.Given() {
		return ""
	}
	return s.shown(f.x) + " mL/h"
}

// BodyWeight is w in kg.
func (s Style) BodyWeight(w BodyWeight) string { return s.plain(w.x, "kg") }

// Surface is a in m².
func (s Style) Surface(a BodySurfaceArea) string { return s.plain(a.x, "m²") }

// Length is l in cm.
func (s Style) Length(l Length) string { return s.plain(l.x, "cm") }

// Percent is p in per cent.
func (s Style) Percent(p Percent) string { return s.plain(p.x, "%") }

func (s Style) plain(x exact, unit string) string {
	if !x.given() {
		return ""
	}
	_, text, _ := s.short(x)
	return text + " " + unit
}

// Number is the bare number r in this style, by the SHORT rule.
func (s Style) Number(r *big.Rat) string {
	_, text, _ := s.short(fromRat(r))
	return text
}

// InCode is c as the barcode carries it: no blank, ASCII units
// (mg, ug, ng, unit, mmol, umol), per mL.
func (c Concentration) InCode() string {
	u := c.Best()
	y, _ := shorten(c.x.quo(u.scale))
	text, _ := y.decimal()
	short := map[string]string{"microgram": "ug", "nanogram": "ng", "micromol": "umol"}
	if w, ok := short[u.word]; ok {
		return text + w + "/mL"
	}
	return text + u.word + "/mL"
}
