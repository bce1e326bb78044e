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
	x     exact
	kind  Kind
	basis Basis
	unit  Unit
	text  string
}

// A DoseRate is what the patient gets per time.
type DoseRate struct {
	x      exact // per hour
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

// A Percent is a relative width, for instance of assay limits.
type Percent struct {
	x    exact // 10 for 10 %
	text string
}

// Given reports whether a value is there at all.
func (a Amount) Given() bool          { return a.x.given() }
func (v Volume) Given() bool          { return v.x.given() }
func (c Concentration) Given() bool   { return c.x.given() }
func (d Dose) Given() bool            { return d.x.given() }
func (d DoseRate) Given() bool        { return d.x.given() }
func (f FlowRate) Given() bool        { return f.x.given() }
func (w BodyWeight) Given() bool      { return w.x.given() }
func (s BodySurfaceArea) Given() bool { return s.x.given() }
func (l Length) Given() bool          { return l.x.given() }
func (p Percent) Given() bool         { return p.x.given() }

// Written is the text a value was read from, "" for a worked value.
func (a Amount) Written() string          { return a.text }
func (v Volume) Written() string          { return v.text }
func (c Concentration) Written() string   { return c.text }
func (d Dose) Written() string            { return d.text }
func (d DoseRate) Written() string        { return d.text }
func (f FlowRate) Written() string        { return f.text }
func (w BodyWeight) Written() string      { return w.text }
func (s BodySurfaceArea) Written() string { return s.text }
func (l Length) Written() string          { return l.text }
func (p Percent) Written() string         { return p.text }

// Kind is how the drug is counted.
func (a Amount) Kind() Kind        { return a.kind }
func (c Concentration) Kind() Kind { return c.kind }
func (d Dose) Kind() Kind          { return d.kind }
func (d DoseRate) Kind() Kind      { return d.kind }

// Basis is what the dose is counted per.
func (d Dose) Basis() Basis     { return d.basis }
func (d DoseRate) Basis() Basis { return d.basis }

// Unit is the unit in which the value was written.
func (a Amount) Unit() Unit        { return a.unit }
func (c Concentration) Unit() Unit { return c.unit }
func (d Dose) Unit() Unit          { return d.unit }
func (d DoseRate) Unit() Unit      { return d.unit }

// Period is the unit of time in which the rate was written.
func (d DoseRate) Period() Period { return d.period }

// IsZero reports a given value of nothing.
func (a Amount) IsZero() bool { return a.Given() && a.x.sign() == 0 }
func (v Volume) IsZero() bool { return v.Given() && v.x.sign() == 0 }

// Rat is a copy of the exact value in the base unit: mg, units or mmol; mL;
// per mL; per hour; mL/h; kg; m²; cm; per cent. It is meant for package body
// and for tests, which compare with other people's arithmetic.
func (a Amount) Rat() *big.Rat          { return a.x.copyRat() }
func (v Volume) Rat() *big.Rat          { return v.x.copyRat() }
func (c Concentration) Rat() *big.Rat   { return c.x.copyRat() }
func (d Dose) Rat() *big.Rat            { return d.x.copyRat() }
func (d DoseRate) Rat() *big.Rat        { return d.x.copyRat() }
func (f FlowRate) Rat() *big.Rat        { return f.x.copyRat() }
func (w BodyWeight) Rat() *big.Rat      { return w.x.copyRat() }
func (s BodySurfaceArea) Rat() *big.Rat { return s.x.copyRat() }
func (l Length) Rat() *big.Rat          { return l.x.copyRat() }
func (p Percent) Rat() *big.Rat         { return p.x.copyRat() }

// Millilitres is a volume of r mL.
func Millilitres(r *big.Rat) Volume { return Volume{x: fromRat(r)} }

// MillilitresPerHour is a flow of r mL/h.
func MillilitresPerHour(r *big.Rat) FlowRate { return FlowRate{x: fromRat(r)} }

// Kilograms is a body weight of r kg.
func Kilograms(r *big.Rat) BodyWeight { return BodyWeight{x: fromRat(r)} }

// SquareMetres is a surface area of r m².
func SquareMetres(r *big.Rat) BodySurfaceArea { return BodySurfaceArea{x: fromRat(r)} }

// Centimetres is a height of r cm.
func Centimetres(r *big.Rat) Length { return Length{x: fromRat(r)} }

// PerCent is r %.
func PerCent(r *big.Rat) Percent { return Percent{x: fromRat(r)} }

// AmountOf is n of unit u.
func AmountOf(n *big.Rat, u Unit) Amount {
	return Amount{x: fromRat(n).mul(u.scale), kind: u.kind, unit: u}
}
