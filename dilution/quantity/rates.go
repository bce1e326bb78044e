package quantity

import "math/big"

// For is the absolute dose of a patient of weight w. Errors: *BasisError unless
// d is per kg; *NotGivenError.
func (d Dose) For(w BodyWeight) (Amount, error) {
	if d.basis != PerKilogram {
		return Amount{}, &BasisError{Got: d.basis, Want: PerKilogram}
	}
	if !w.x.positive() {
		return Amount{}, &NotGivenError{What: "body weight"}
	}
	return newAmount(d.x.mul(w.x), d.kind, d.unit), nil
}

// On is the absolute dose for a surface area s. Errors: *BasisError unless d is
// per m²; *NotGivenError.
func (d Dose) On(s BodySurfaceArea) (Amount, error) {
	if d.basis != PerSquareMetre {
		return Amount{}, &BasisError{Got: d.basis, Want: PerSquareMetre}
	}
	if !s.x.positive() {
		return Amount{}, &NotGivenError{What: "surface area"}
	}
	return newAmount(d.x.mul(s.x), d.kind, d.unit), nil
}

// Amount is the dose itself. Error: *BasisError unless d is absolute.
func (d Dose) Amount() (Amount, error) {
	if d.basis != Absolute {
		return Amount{}, &BasisError{Got: d.basis, Want: Absolute}
	}
	return Amount{x: d.x, kind: d.kind, unit: d.unit, text: d.text}, nil
}

// For is the absolute dose rate of a patient of weight w. Errors: *BasisError
// unless d is per kg; *NotGivenError.
func (d DoseRate) For(w BodyWeight) (DoseRate, error) {
	if d.basis != PerKilogram {
		return DoseRate{}, &BasisError{Got: d.basis, Want: PerKilogram}
	}
	if !w.x.positive() {
		return DoseRate{}, &NotGivenError{What: "body weight"}
	}
	return d.with(d.x.mul(w.x), Absolute), nil
}

// On is the absolute dose rate for a surface area s. Errors: *BasisError unless
// d is per m²; *NotGivenError.
func (d DoseRate) On(s BodySurfaceArea) (DoseRate, error) {
	if d.basis != PerSquareMetre {
		return DoseRate{}, &BasisError{Got: d.basis, Want: PerSquareMetre}
	}
	if !s.x.positive() {
		return DoseRate{}, &NotGivenError{What: "surface area"}
	}
	return d.with(d.x.mul(s.x), Absolute), nil
}

// At is the flow rate that gives the dose rate d at concentration c. Errors:
// *BasisError unless d is absolute; *KindError if they are counted in unlike
// ways or c is not given.
func (d DoseRate) At(c Concentration) (FlowRate, error) {
	if d.basis != Absolute {
		return FlowRate{}, &BasisError{Got: d.basis, Want: Absolute}
	}
	if err := sameKind(d.kind, c.kind); err != nil {
		return FlowRate{}, err
	}
	return FlowRate{x: d.x.quo(c.x)}, nil
}

// Giving is the absolute dose rate that flow f of concentration c gives,
// written in unit u per p. Errors: *NotGivenError; *KindError if u counts in
// another way than c.
func (f FlowRate) Giving(c Concentration, u Unit, p Period) (DoseRate, error) {
	if !f.Given() || !c.Given() {
		return DoseRate{}, &NotGivenError{What: "flow rate or concentration"}
	}
	if err := sameKind(u.kind, c.kind); err != nil {
		return DoseRate{}, err
	}
	if !p.perHour().given() {
		return DoseRate{}, &NotGivenError{What: "unit of time"}
	}
	return DoseRate{x: f.x.mul(c.x), kind: c.kind, basis: Absolute, unit: u, period: p}, nil
}

// PerWeight is the dose rate d counted per kilogram of w. Errors: *BasisError
// unless d is absolute; *NotGivenError.
func (d DoseRate) PerWeight(w BodyWeight) (DoseRate, error) {
	if d.basis != Absolute {
		return DoseRate{}, &BasisError{Got: d.basis, Want: Absolute}
	}
	if !w.x.positive() {
		return DoseRate{}, &NotGivenError{What: "body weight"}
	}
	return d.with(d.x.quo(w.x), PerKilogram), nil
}

// PerSurface is the dose rate d counted per square metre of s. Errors:
// *BasisError unless d is absolute; *NotGivenError.
func (d DoseRate) PerSurface(s BodySurfaceArea) (DoseRate, error) {
	if d.basis != Absolute {
		return DoseRate{}, &BasisError{Got: d.basis, Want: Absolute}
	}
	if !s.x.positive() {
		return DoseRate{}, &NotGivenError{What: "surface area"}
	}
	return d.with(d.x.quo(s.x), PerSquareMetre), nil
}

// Scaled is d multiplied by r; unit, basis and period stay. It is not given if
// d is not, or if r is nil or negative.
func (d DoseRate) Scaled(r *big.Rat) DoseRate { return d.with(d.x.mul(notNegative(r)), d.basis) }

// Scaled is d multiplied by r; unit and basis stay. It is not given if d is
// not, or if r is nil or negative.
func (d Dose) Scaled(r *big.Rat) Dose {
	x := d.x.mul(notNegative(r))
	if !x.given() {
		return Dose{}
	}
	return Dose{x: x, kind: d.kind, basis: d.basis, unit: d.unit}
}

// Scaled is f multiplied by r. It is not given if f is not, or if r is nil or
// negative.
func (f FlowRate) Scaled(r *big.Rat) FlowRate { return FlowRate{x: f.x.mul(notNegative(r))} }

// Minutes is how long v lasts at flow f, in whole minutes, rounded down. Error:
// *NotGivenError, also for a flow of nothing.
func (v Volume) Minutes(f FlowRate) (int64, error) {
	if !v.Given() || !f.x.positive() {
		return 0, &NotGivenError{What: "volume or flow rate"}
	}
	n := v.x.mul(whole(60)).floorDiv(f.x)
	if !n.IsInt64() {
		return 0, &NotGivenError{What: "a run time that a clock can hold"}
	}
	return n.Int64(), nil
}
