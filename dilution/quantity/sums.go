package quantity

import "math/big"

func sameKind(got, want Kind) error {
	if got != want || got == 0 {
		return &KindError{Got: got, Want: want}
	}
	return nil
}

// In is the concentration when a is dissolved in the final volume v.
func (a Amount) In(v Volume) (Concentration, error) {
	if !a.Given() || !v.Given() {
		return Concentration{}, &NotGivenError{"amount or final volume"}
	}
	if a.x.sign() <= 0 || v.x.sign() <= 0 {
		return Concentration{}, &SyntaxError{Got: a.x.text() + " in " + v.x.text(), Want: "an amount in a volume, both above zero", Why: "nothing divides by it", Code: ZeroOrLess}
	}
	return Concentration{x: a.x.quo(v.x), kind: a.kind, unit: a.unit}, nil
}

// DrawnAt is the volume that holds a at concentration c.
func (a Amount) DrawnAt(c Concentration) (Volume, error) {
	if !a.Given() || !c.Given() {
		return Volume{}, &NotGivenError{"amount or concentration"}
	}
	if err := sameKind(a.kind, c.kind); err != nil {
		return Volume{}, err
	}
	return Volume{x: a.x.quo(c.x)}, nil
}

// Holds is the amount in v at concentration c.
func (v Volume) Holds(c Concentration) (Amount, error) {
	if !v.Given() || !c.Given() {
		return Amount{}, &NotGivenError{"volume or concentration"}
	}
	return Amount{x: v.x.mul(c.x), kind: c.kind, unit: c.unit}, nil
}

// Plus is a + b; both must be counted the same way.
func (a Amount) Plus(b Amount) (Amount, error) {
	if err := sameKind(a.kind, b.kind); err != nil {
		return Amount{}, err
	}
	return Amount{x: a.x.add(b.x), kind: a.kind, unit: a.unit}, nil
}

// Minus is a - b, which must not be below zero.
func (a Amount) Minus(b Amount) (Amount, error) {
	if err := sameKind(a.kind, b.kind); err != nil {
		return Amount{}, err
	}
	d := a.x.sub(b.x)
	if d.sign() < 0 {
		return Amount{}, &SyntaxError{Got: d.text(), Want: "an amount of zero or more", Why: "more taken than there is", Code: ZeroOrLess}
	}
	return Amount{x: d, kind: a.kind, unit: a.unit}, nil
}

// Times is n times a.
func (a Amount) Times(n int) Amount {
	return Amount{x: a.x.mul(whole(int64(n))), kind: a.kind, unit: a.unit}
}

// Scaled is a multiplied by the bare ratio r (another drug's share, a salt
// factor); the result is counted in unit u, which may be of another kind: the
// caller answers for the factor's source (rule R4).
func (a Amount) Scaled(r *big.Rat, u Unit) Amount {
	return Amount{x: a.x.mul(fromRat(r)), kind: u.kind, unit: u}
}

// Share is a divided by b, both counted the same way.
func (a Amount) Share(b Amount) (*big.Rat, error) {
	if err := sameKind(a.kind, b.kind); err != nil {
		return nil, err
	}
	if b.x.sign() <= 0 {
		return nil, &NotGivenError{"amount to divide by"}
	}
	return a.x.quo(b.x).r, nil
}

// Times is n times v.
func (v Volume) Times(n int) Volume { return Volume{x: v.x.mul(whole(int64(n)))} }

// Plus is v + w.
func (v Volume) Plus(w Volume) Volume { return Volume{x: v.x.add(w.x)} }

// Minus is v - w, which must not be below zero.
func (v Volume) Minus(w Volume) (Volume, error) {
	d := v.x.sub(w.x)
	if d.sign() < 0 {
		return Volume{}, &SyntaxError{Got: d.text() + " mL", Want: "a volume of zero or more", Why: "more taken than there is", Code: ZeroOrLess}
	}
	return Volume{x: d}, nil
}

// ToStep moves v to a multiple of step and says what was lost: the moved
// volume minus v, as a share of v in per cent (rule R2).
func (v Volume) ToStep(step Volume, d Direction) (Volume, *big.Rat, error) {
	x, err := v.x.toStep(step.x, d)
	if err != nil {
		return Volume{}, nil, err
	}
	return Volume{x: x}, lost(v.x, x), nil
}

// ToStep moves f to the pump's step and says what was lost, in per cent of f.
func (f FlowRate) ToStep(step FlowRate, d Direction) (FlowRate, *big.Rat, error) {
	x, err := f.x.toStep(step.x, d)
	if err != nil {
		return FlowRate{}, nil, err
	}
	return FlowRate{x: x}, lost(f.x, x), nil
}

// ToStep moves w to a multiple of step kilograms.
func (w BodyWeight) ToStep(step *big.Rat, d Direction) (BodyWeight, error) {
	x, err := w.x.toStep(fromRat(step), d)
	return BodyWeight{x: x}, err
}

// ToStep moves s to a multiple of step square metres.
func (s BodySurfaceArea) ToStep(step *big.Rat, d Direction) (BodySurfaceArea, error) {
	x, err := s.x.toStep(fromRat(step), d)
	return BodySurfaceArea{x: x}, err
}

// ToStep moves p to a multiple of step per cent.
func (p Percent) ToStep(step *big.Rat, d Direction) (Percent, error) {
	x, err := p.x.toStep(fromRat(step), d)
	return Percent{x: x}, err
}

func lost(before, after exact) *big.Rat {
	if before.sign() == 0 {
		return new(big.Rat)
	}
	return after.sub(before).quo(before).mul(whole(100)).r
}

// Containers is how many containers of volume each hold at least v.
func (v Volume) Containers(each Volume) (int, error) {
	n, err := v.x.toStep(each.x, Up)
	if err != nil {
		return 0, err
	}
	q := n.quo(each.x).r.Num()
	if !q.IsInt64() || q.Int64() > 10000 {
		return 0, &SyntaxError{Got: v.x.text() + " mL", Want: "at most 10,000 containers", Why: "far more than a person opens", Code: ZeroOrLess}
	}
	return int(q.Int64()), nil
}

// For is the absolute dose of a patient of weight w. The dose must be per kg.
func (d Dose) For(w BodyWeight) (Amount, error) {
	if d.basis != PerKilogram {
		return Amount{}, &BasisError{Got: d.basis, Want: PerKilogram}
	}
	if !w.Given() {
		return Amount{}, &NotGivenError{"body weight"}
	}
	return Amount{x: d.x.mul(w.x), kind: d.kind, unit: d.unit}, nil
}

// On is the absolute dose for a surface area s. The dose must be per m².
func (d Dose) On(s BodySurfaceArea) (Amount, error) {
	if d.basis != PerSquareMetre {
		return Amount{}, &BasisError{Got: d.basis, Want: PerSquareMetre}
	}
	if !s.Given() {
		return Amount{}, &NotGivenError{"surface area"}
	}
	return Amount{x: d.x.mul(s.x), kind: d.kind, unit: d.unit}, nil
}

// Amount is the dose itself when it is absolute.
func (d Dose) Amount() (Amount, error) {
	if d.basis != Absolute {
		return Amount{}, &BasisError{Got: d.basis, Want: Absolute}
	}
	return Amount{x: d.x, kind: d.kind, unit: d.unit, text: d.text}, nil
}

// For is the absolute dose rate of a patient of weight w.
func (d DoseRate) For(w BodyWeight) (DoseRate, error) {
	if d.basis != PerKilogram {
		return DoseRate{}, &BasisError{Got: d.basis, Want: PerKilogram}
	}
	if !w.Given() {
		return DoseRate{}, &NotGivenError{"body weight"}
	}
	return DoseRate{x: d.x.mul(w.x), kind: d.kind, basis: Absolute, unit: d.unit, period: d.period}, nil
}

// On is the absolute dose rate for a surface area s.
func (d DoseRate) On(s BodySurfaceArea) (DoseRate, error) {
	if d.basis != PerSquareMetre {
		return DoseRate{}, &BasisError{Got: d.basis, Want: PerSquareMetre}
	}
	if !s.Given() {
		return DoseRate{}, &NotGivenError{"surface area"}
	}
	return DoseRate{x: d.x.mul(s.x), kind: d.kind, basis: Absolute, unit: d.unit, period: d.period}, nil
}

// At is the flow rate that gives the absolute dose rate d at concentration c.
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
// written in unit u per p.
func (f FlowRate) Giving(c Concentration, u Unit, p Period) (DoseRate, error) {
	if !f.Given() || !c.Given() {
		return DoseRate{}, &NotGivenError{"flow rate or concentration"}
	}
	if err := sameKind(u.kind, c.kind); err != nil {
		return DoseRate{}, err
	}
	return DoseRate{x: f.x.mul(c.x), kind: c.kind, basis: Absolute, unit: u, period: p}, nil
}

// PerWeight is the absolute dose rate d counted per kilogram of w.
func (d DoseRate) PerWeight(w BodyWeight) (DoseRate, error) {
	if d.basis != Absolute || !w.Given() || w.x.sign() <= 0 {
		return DoseRate{}, &BasisError{Got: d.basis, Want: Absolute}
	}
	return DoseRate{x: d.x.quo(w.x), kind: d.kind, basis: PerKilogram, unit: d.unit, period: d.period}, nil
}

// PerSurface is the absolute dose rate d counted per square metre of s.
func (d DoseRate) PerSurface(s BodySurfaceArea) (DoseRate, error) {
	if d.basis != Absolute || !s.Given() || s.x.sign() <= 0 {
		return DoseRate{}, &BasisError{Got: d.basis, Want: Absolute}
	}
	return DoseRate{x: d.x.quo(s.x), kind: d.kind, basis: PerSquareMetre, unit: d.unit, period: d.period}, nil
}

// Scaled is d multiplied by r; unit and basis stay.
func (d DoseRate) Scaled(r *big.Rat) DoseRate {
	return DoseRate{x: d.x.mul(fromRat(r)), kind: d.kind, basis: d.basis, unit: d.unit, period: d.period}
}

// Scaled is d multiplied by r; unit and basis stay.
func (d Dose) Scaled(r *big.Rat) Dose {
	return Dose{x: d.x.mul(fromRat(r)), kind: d.kind, basis: d.basis, unit: d.unit}
}

// Scaled is f multiplied by r.
func (f FlowRate) Scaled(r *big.Rat) FlowRate { return FlowRate{x: f.x.mul(fromRat(r))} }

// Scaled is c multiplied by r.
func (c Concentration) Scaled(r *big.Rat) Concentration {
	return Concentration{x: c.x.mul(fromRat(r)), kind: c.kind, unit: c.unit}
}

// Minutes is how long v lasts at flow f, in whole minutes, rounded down.
func (v Volume) Minutes(f FlowRate) (int64, error) {
	if !v.Given() || !f.Given() || f.x.sign() <= 0 {
		return 0, &NotGivenError{"volume or flow rate"}
	}
	n := v.x.mul(whole(60)).floorDiv(f.x)
	if !n.IsInt64() {
		return 0, &NotGivenError{"a run time that a clock can hold"}
	}
	return n.Int64(), nil
}
