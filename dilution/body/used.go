package body

import (
	"math/big"

	"drawup/dilution/quantity"
	"drawup/dilution/roots"
)

// halfUp moves r, which is not negative, to the nearest multiple of step; a
// tie goes up (rule R2).
func halfUp(r, step *big.Rat) *big.Rat {
	n := add(quo(r, step), rat(1, 2))
	return mul(new(big.Rat).SetInt(new(big.Int).Div(n.Num(), n.Denom())), step)
}

// Used is the weight that is printed and dosed by: the actual weight as typed,
// each other kind rounded half up to 0.1 kg (rule R2). Errors: those of the
// equation; *NotAWeightError for surface, none and kinds that are not given.
func (s Size) Used(kind Kind) (quantity.BodyWeight, error) {
	var exact quantity.BodyWeight
	var err error
	switch kind {
	case Actual:
		return s.Weight, s.need("actual weight", NeedWeight)
	case Ideal:
		exact, err = s.Ideal()
	case Adjusted:
		exact, err = s.Adjusted()
	case Lean:
		exact, err = s.Lean()
	default: // surface, none, not given
		return quantity.BodyWeight{}, &NotAWeightError{kind}
	}
	if err != nil {
		return quantity.BodyWeight{}, err
	}
	return exact.ToStep(rat(1, 10), quantity.HalfUp)
}

// UsedSurface is the surface area that is printed and dosed by: Mosteller 1987
// rounded half up to 0.01 m², from the exact square and not from a root that
// was rounded before. Error: *MissingError.
func (s Size) UsedSurface() (quantity.BodySurfaceArea, error) {
	square, err := s.mostellerSquare()
	if err != nil {
		return quantity.BodySurfaceArea{}, err
	}
	hundredths := roots.HalfUp(mul(square, rat(10000, 1)), 2)
	return quantity.SquareMetres(new(big.Rat).SetFrac(hundredths, big.NewInt(100))), nil
}
