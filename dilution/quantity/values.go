package quantity

import "math/big"

// Given reports whether there is an amount at all.
func (a Amount) Given() bool { return a.x.given() }

// Given reports whether there is a volume at all.
func (v Volume) Given() bool { return v.x.given() }

// Given reports whether there is a concentration at all.
func (c Concentration) Given() bool { return c.x.given() }

// Given reports whether there is a dose at all.
func (d Dose) Given() bool { return d.x.given() }

// Given reports whether there is a dose rate at all.
func (d DoseRate) Given() bool { return d.x.given() }

// Given reports whether there is a flow rate at all.
func (f FlowRate) Given() bool { return f.x.given() }

// Given reports whether there is a body weight at all.
func (w BodyWeight) Given() bool { return w.x.given() }

// Given reports whether there is a surface area at all.
func (s BodySurfaceArea) Given() bool { return s.x.given() }

// Given reports whether there is a height at all.
func (l Length) Given() bool { return l.x.given() }

// Given reports whether there is a share at all.
func (p Percent) Given() bool { return p.x.given() }

// Written is the text that the amount was read from, blanks put in order; "" for
// a worked value.
func (a Amount) Written() string { return a.text }

// Written is the text that the volume was read from, blanks put in order; "" for
// a worked value.
func (v Volume) Written() string { return v.text }

// Written is the text that the concentration was read from, blanks put in order; "" for
// a worked value.
func (c Concentration) Written() string { return c.text }

// Written is the text that the dose was read from, blanks put in order; "" for
// a worked value.
func (d Dose) Written() string { return d.text }

// Written is the text that the dose rate was read from, blanks put in order; "" for
// a worked value.
func (d DoseRate) Written() string { return d.text }

// Written is the text that the flow rate was read from, blanks put in order; "" for
// a worked value.
func (f FlowRate) Written() string { return f.text }

// Written is the text that the body weight was read from, blanks put in order; "" for
// a worked value.
func (w BodyWeight) Written() string { return w.text }

// Written is the text that the surface area was read from, blanks put in order; "" for
// a worked value.
func (s BodySurfaceArea) Written() string { return s.text }

// Written is the text that the height was read from, blanks put in order; "" for
// a worked value.
func (l Length) Written() string { return l.text }

// Written is the text that the share was read from, blanks put in order; "" for
// a worked value.
func (p Percent) Written() string { return p.text }

// Kind is how the drug is counted; zero if nothing is given.
func (a Amount) Kind() Kind { return a.kind }

// Kind is how the drug is counted; zero if nothing is given.
func (c Concentration) Kind() Kind { return c.kind }

// Kind is how the drug is counted; zero if nothing is given.
func (d Dose) Kind() Kind { return d.kind }

// Kind is how the drug is counted; zero if nothing is given.
func (d DoseRate) Kind() Kind { return d.kind }

// Basis is what the dose is counted per; zero if nothing is given.
func (d Dose) Basis() Basis { return d.basis }

// Basis is what the dose rate is counted per; zero if nothing is given.
func (d DoseRate) Basis() Basis { return d.basis }

// Unit is the unit of amount in which the amount was written, or from
// which it was worked.
func (a Amount) Unit() Unit { return a.unit }

// Unit is the unit of amount in which the concentration was written, or from
// which it was worked.
func (c Concentration) Unit() Unit { return c.unit }

// Unit is the unit of amount in which the dose was written, or from
// which it was worked.
func (d Dose) Unit() Unit { return d.unit }

// Unit is the unit of amount in which the dose rate was written, or from
// which it was worked.
func (d DoseRate) Unit() Unit { return d.unit }

// Period is the unit of time in which the rate was written.
func (d DoseRate) Period() Period { return d.period }

// IsZero reports an amount that is given and is nothing.
func (a Amount) IsZero() bool { return a.Given() && a.x.sign() == 0 }

// IsZero reports a volume that is given and is nothing.
func (v Volume) IsZero() bool { return v.Given() && v.x.sign() == 0 }

// Rat is a copy of the exact value in mg, units or mmol; nil if nothing
// is given. It is meant for package body and for tests, which compare with
// other people's arithmetic.
func (a Amount) Rat() *big.Rat { return a.x.copyRat() }

// Rat is a copy of the exact value in mL; nil if nothing
// is given. It is meant for package body and for tests, which compare with
// other people's arithmetic.
func (v Volume) Rat() *big.Rat { return v.x.copyRat() }

// Rat is a copy of the exact value in mg, units or mmol per mL; nil if nothing
// is given. It is meant for package body and for tests, which compare with
// other people's arithmetic.
func (c Concentration) Rat() *big.Rat { return c.x.copyRat() }

// Rat is a copy of the exact value in mg, units or mmol, per kg or m² if it is counted so; nil if nothing
// is given. It is meant for package body and for tests, which compare with
// other people's arithmetic.
func (d Dose) Rat() *big.Rat { return d.x.copyRat() }

// Rat is a copy of the exact value in mg, units or mmol per hour, per kg or m² if it is counted so; nil if nothing
// is given. It is meant for package body and for tests, which compare with
// other people's arithmetic.
func (d DoseRate) Rat() *big.Rat { return d.x.copyRat() }

// Rat is a copy of the exact value in mL/h; nil if nothing
// is given. It is meant for package body and for tests, which compare with
// other people's arithmetic.
func (f FlowRate) Rat() *big.Rat { return f.x.copyRat() }

// Rat is a copy of the exact value in kg; nil if nothing
// is given. It is meant for package body and for tests, which compare with
// other people's arithmetic.
func (w BodyWeight) Rat() *big.Rat { return w.x.copyRat() }

// Rat is a copy of the exact value in m²; nil if nothing
// is given. It is meant for package body and for tests, which compare with
// other people's arithmetic.
func (s BodySurfaceArea) Rat() *big.Rat { return s.x.copyRat() }

// Rat is a copy of the exact value in cm; nil if nothing
// is given. It is meant for package body and for tests, which compare with
// other people's arithmetic.
func (l Length) Rat() *big.Rat { return l.x.copyRat() }

// Rat is a copy of the exact value in per cent; nil if nothing
// is given. It is meant for package body and for tests, which compare with
// other people's arithmetic.
func (p Percent) Rat() *big.Rat { return p.x.copyRat() }
