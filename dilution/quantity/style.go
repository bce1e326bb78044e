package quantity

import (
	"math/big"
	"strings"
)

// A Style is one house style of numbers and units on paper (rule R14). The zero
// value is no style and prints nothing.
type Style struct{ name string }

// UK writes microgram in full and groups thousands with a comma.
func UK() Style { return Style{"uk"} }

// US writes mcg for microgram and groups thousands with a comma.
func US() Style { return Style{"us"} }

// SI writes microgram in full and groups thousands with a no-break blank,
// U+00A0: ISO documents use the thin one, U+202F, which the condensed faces in
// package fonts lack.
func SI() Style { return Style{"si"} }

// StyleNamed finds a style by its name: uk, us, si.
func StyleNamed(s string) (Style, bool) {
	switch s {
	case "uk", "us", "si":
		return Style{s}, true
	}
	return Style{}, false
}

// String is the style's name, "" for the zero value.
func (s Style) String() string { return s.name }

// Amount is a in the unit that suits it ([Amount.Best]), by the SHORT rule:
// exact when four significant digits hold the number, else half up to three of
// them, or to a whole number from 1,000 on (rule R2). Here and below it is ""
// if nothing is given.
func (s Style) Amount(a Amount) string { return s.AmountIn(a, a.Best()) }

// AmountIn is a in unit u, by the SHORT rule; "" if u counts in another way.
func (s Style) AmountIn(a Amount, u Unit) string { return s.counted(in(a.x, a.kind, u), u, "") }

// Concentration is c per mL, never per another volume, in the unit that suits
// it ([Concentration.Best]), by the SHORT rule.
func (s Style) Concentration(c Concentration) string { return s.ConcentrationIn(c, c.Best()) }

// ConcentrationIn is c per mL in unit u, by the SHORT rule; "" if u counts in
// another way.
func (s Style) ConcentrationIn(c Concentration, u Unit) string {
	return s.counted(in(c.x, c.kind, u), u, "/mL")
}

// Dose is d in its own unit, by the SHORT rule.
func (s Style) Dose(d Dose) string { return s.counted(d.inOwnUnit(), d.unit, basisTail(d.basis)) }

// DoseRate is d in its own unit and period, by the SHORT rule.
func (s Style) DoseRate(d DoseRate) string {
	return s.counted(d.inOwnUnit(), d.unit, basisTail(d.basis)+"/"+d.period.String())
}

// DoseRateIn is d in unit u and its own period, by the SHORT rule; "" if u
// counts in another way.
func (s Style) DoseRateIn(d DoseRate, u Unit) string {
	x := in(d.x, d.kind, u)
	if !x.given() {
		return ""
	}
	return s.counted(x.quo(d.period.perHour()), u, basisTail(d.basis)+"/"+d.period.String())
}

// Volume is v in mL. What a scale or a pump can show, two decimals or fewer, is
// exact; anything else goes by the SHORT rule.
func (s Style) Volume(v Volume) string { return s.shown(v.x, " mL") }

// FlowRate is f in mL/h, written as a volume is.
func (s Style) FlowRate(f FlowRate) string { return s.shown(f.x, " mL/h") }

// BodyWeight is w in kg, by the SHORT rule.
func (s Style) BodyWeight(w BodyWeight) string { return s.plain(w.x, " kg") }

// Surface is a in m², by the SHORT rule.
func (s Style) Surface(a BodySurfaceArea) string { return s.plain(a.x, " m²") }

// Length is l in cm, by the SHORT rule.
func (s Style) Length(l Length) string { return s.plain(l.x, " cm") }

// Percent is p in per cent, by the SHORT rule.
func (s Style) Percent(p Percent) string { return s.plain(p.x, " %") }

// Number is the bare number r, by the SHORT rule; "" if r is nil.
func (s Style) Number(r *big.Rat) string { return s.plain(fromRat(r), "") }

// plain is x with a unit that has one form; a zero style prints nothing.
func (s Style) plain(x exact, unit string) string {
	if s.name == "" || !x.given() {
		return ""
	}
	return s.group(shorten(x).text()) + unit
}

// shown is x exactly when two decimals are enough, else by the SHORT rule.
func (s Style) shown(x exact, unit string) string {
	if s.name == "" || !x.given() {
		return ""
	}
	if places, ok := x.places(); ok && places <= 2 {
		return s.group(x.text()) + unit
	}
	return s.plain(x, unit)
}

// counted is x of unit u, in its singular or plural, and what it is per.
func (s Style) counted(x exact, u Unit, per string) string {
	if !x.given() {
		return ""
	}
	return s.plain(x, " "+s.word(u, shorten(x))+per)
}

// word is the unit as this style writes it beside the number x.
func (s Style) word(u Unit, x exact) string {
	if s.name == "us" && u.word == "microgram" {
		return "mcg"
	}
	switch u.word {
	case "microgram", "nanogram", "unit", "milliunit":
		if x.cmp(whole(1)) > 0 {
			return u.word + "s"
		}
	}
	return u.word
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

// group puts separators into a plain decimal text, from 1,000 on.
func (s Style) group(text string) string {
	head, tail, point := strings.Cut(text, ".")
	head, minus := strings.CutPrefix(head, "-")
	sep := ","
	if s.name == "si" {
		sep = "\u00a0"
	}
	var b strings.Builder
	if minus {
		b.WriteString("-")
	}
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
