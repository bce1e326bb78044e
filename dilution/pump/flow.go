package pump

import (
	"drawup/dilution/quantity"
)

// A Per is what a dose rate is counted per: nothing, one body weight or one
// surface area. Its zero value is refused.
type Per struct {
	basis   quantity.Basis
	weight  quantity.BodyWeight
	surface quantity.BodySurfaceArea
}

// PerNothing is for absolute dose rates such as 5 mg/h.
func PerNothing() Per { return Per{basis: quantity.Absolute} }

// PerWeight is for dose rates per kilogram of w.
func PerWeight(w quantity.BodyWeight) Per { return Per{basis: quantity.PerKilogram, weight: w} }

// PerSurface is for dose rates per square metre of s.
func PerSurface(s quantity.BodySurfaceArea) Per {
	return Per{basis: quantity.PerSquareMetre, surface: s}
}

// Basis is what it counts per.
func (p Per) Basis() quantity.Basis { return p.basis }

// ready refuses a Per that does not go with a dose rate of basis b, or whose
// weight or surface is missing or zero.
func (p Per) ready(b quantity.Basis) error {
	if p.basis == 0 || p.basis != b {
		return &quantity.BasisError{Got: b, Want: p.basis}
	}
	switch p.basis {
	case quantity.PerKilogram:
		if !p.weight.Given() || p.weight.Rat().Sign() <= 0 {
			return &quantity.NotGivenError{What: "body weight"}
		}
	case quantity.PerSquareMetre:
		if !p.surface.Given() || p.surface.Rat().Sign() <= 0 {
			return &quantity.NotGivenError{What: "surface area"}
		}
	case quantity.Absolute:
	}
	return nil
}

// absolute is the dose rate of this patient.
func (p Per) absolute(dose quantity.DoseRate) (quantity.DoseRate, error) {
	if err := p.ready(dose.Basis()); err != nil {
		return quantity.DoseRate{}, err
	}
	switch p.basis {
	case quantity.PerKilogram:
		return dose.For(p.weight)
	case quantity.PerSquareMetre:
		return dose.On(p.surface)
	case quantity.Absolute:
		return dose, nil
	}
	return quantity.DoseRate{}, &quantity.BasisError{Got: dose.Basis(), Want: p.basis}
}

// Flow is the exact flow rate that gives dose at concentration c. Errors:
// *quantity.NotGivenError for a value that is missing or not above zero,
// *quantity.BasisError when dose is not counted per what per says,
// *quantity.KindError when dose and c count the drug in unlike ways (rule R4).
func Flow(dose quantity.DoseRate, per Per, c quantity.Concentration) (quantity.FlowRate, error) {
	if !dose.Given() || dose.Rat().Sign() <= 0 {
		return quantity.FlowRate{}, &quantity.NotGivenError{What: "a dose rate above zero"}
	}
	if err := concentrated(c); err != nil {
		return quantity.FlowRate{}, err
	}
	whole, err := per.absolute(dose)
	if err != nil {
		return quantity.FlowRate{}, err
	}
	return whole.At(c)
}

// Delivered is the exact dose rate that flow f gives at concentration c,
// written in the unit and period of like and counted per the basis of like.
// Errors are those of [Flow].
func Delivered(f quantity.FlowRate, per Per, c quantity.Concentration, like quantity.DoseRate) (quantity.DoseRate, error) {
	if !f.Given() {
		return quantity.DoseRate{}, &quantity.NotGivenError{What: "flow rate"}
	}
	if !like.Given() {
		return quantity.DoseRate{}, &quantity.NotGivenError{What: "a dose rate whose unit to use"}
	}
	if err := concentrated(c); err != nil {
		return quantity.DoseRate{}, err
	}
	if err := per.ready(like.Basis()); err != nil {
		return quantity.DoseRate{}, err
	}
	whole, err := f.Giving(c, like.Unit(), like.Period())
	if err != nil {
		return quantity.DoseRate{}, err
	}
	switch per.basis {
	case quantity.PerKilogram:
		return whole.PerWeight(per.weight)
	case quantity.PerSquareMetre:
		return whole.PerSurface(per.surface)
	case quantity.Absolute:
		return whole, nil
	}
	return quantity.DoseRate{}, &quantity.BasisError{Got: like.Basis(), Want: per.basis}
}

func concentrated(c quantity.Concentration) error {
	if !c.Given() || c.Rat().Sign() <= 0 {
		return &quantity.NotGivenError{What: "a concentration above zero"}
	}
	return nil
}

// RunTime is how long the volume v lasts at rate, in whole minutes, rounded
// down. Error: *quantity.NotGivenError for a value that is missing, a rate of
// zero, or a time that no clock holds.
func RunTime(v quantity.Volume, rate quantity.FlowRate) (int64, error) { return v.Minutes(rate) }
