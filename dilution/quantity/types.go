package quantity

import "math/big"

// An Amount is how much drug there is. It is never negative.
// Its zero value means that nobody has given an amount.
type Amount struct {
	x    exact // in mg, units or mmol
	kind Kind
	unit Unit // as written
	text string
}

// A Volume is a volume of fluid, never negative.
type Volume struct {
	x    exact // in mL
	text string
}

// A Concentration is amount of drug per volume, greater than zero.
type Concentration struct {
	x    exact // in mg, units or mmol per mL
	kind Kind
	unit Unit
	text string
}

// A Dose is what the patient gets once: absolute, per kg or per m².
type Dose struct {
	x     exact // in mg, units or mmol
	kind  Kind
	basis Basis
	unit  Unit
	text  string
}

// A DoseRate is what the patient gets per time.
type DoseRate struct {
	x      exact // in mg, units or mmol per hour
	kind   Kind
	basis  Basis
	unit   Unit
	period Period
	text   string
}

// A FlowRate is volume per time.
type FlowRate struct {
	x    exact // in mL/h
	text string
}

// A BodyWeight is the patient's weight in kilograms. It is a type of its own
// so that a dose per kilogram cannot cancel against it by accident (rule R3).
type BodyWeight struct {
	x    exact
	text string
}

// A BodySurfaceArea is the patient's surface in square metres.
type BodySurfaceArea struct {
	x    exact
	text string
}

// A Length is the patient's height in centimetres.
type Length struct {
	x    exact
	text string
}

// A Percent is a relative width, for instance of assay limits, or what a step
// lost.
type Percent struct {
	x    exact // 10 for 10 %
	text string
}

// Millilitres is a volume of r mL. A nil or negative r is not given.
func Millilitres(r *big.Rat) Volume { return Volume{x: notNegative(r)} }

// MillilitresPerHour is a flow of r mL/h. A nil or negative r is not given.
func MillilitresPerHour(r *big.Rat) FlowRate { return FlowRate{x: notNegative(r)} }

// Kilograms is a body weight of r kg. A nil or negative r is not given.
func Kilograms(r *big.Rat) BodyWeight { return BodyWeight{x: notNegative(r)} }

// SquareMetres is a surface area of r m². A nil or negative r is not given.
func SquareMetres(r *big.Rat) BodySurfaceArea { return BodySurfaceArea{x: notNegative(r)} }

// Centimetres is a height of r cm. A nil or negative r is not given.
func Centimetres(r *big.Rat) Length { return Length{x: notNegative(r)} }

// PerCent is r %, of either sign. A nil r is not given.
func PerCent(r *big.Rat) Percent { return Percent{x: fromRat(r)} }

// AmountOf is n of unit u. A nil or negative n, and the zero unit, give an
// amount that is not given.
func AmountOf(n *big.Rat, u Unit) Amount {
	return newAmount(notNegative(n).mul(u.scale), u.kind, u)
}

// The makers of worked values below give the zero value if x is not given, so
// that no value without a number has a kind.

func newAmount(x exact, k Kind, u Unit) Amount {
	if !x.given() {
		return Amount{}
	}
	return Amount{x: x, kind: k, unit: u}
}

// newConcentration also turns away zero, which is no concentration.
func newConcentration(x exact, k Kind, u Unit) Concentration {
	if !x.positive() {
		return Concentration{}
	}
	return Concentration{x: x, kind: k, unit: u}
}

// with is d with another value and basis.
func (d DoseRate) with(x exact, b Basis) DoseRate {
	if !x.given() {
		return DoseRate{}
	}
	return DoseRate{x: x, kind: d.kind, basis: b, unit: d.unit, period: d.period}
}
