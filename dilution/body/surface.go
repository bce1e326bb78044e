package body

import (
	"math/big"

	"drawup/dilution/quantity"
	"drawup/dilution/roots"
)

// mostellerSquare is the exact square of the Mosteller area, H W / 3600.
func (s Size) mostellerSquare() (*big.Rat, error) {
	if err := s.need(mostellerArea, NeedHeight, NeedWeight); err != nil {
		return nil, err
	}
	return quo(mul(s.Height.Rat(), s.Weight.Rat()), rat(3600, 1)), nil
}

// Mosteller is the surface area after Mosteller 1987, the root of H W / 3600
// (cm, kg), to 40 significant digits, half up. Error: *MissingError.
func (s Size) Mosteller() (quantity.BodySurfaceArea, error) {
	square, err := s.mostellerSquare()
	if err != nil {
		return quantity.BodySurfaceArea{}, err
	}
	return quantity.SquareMetres(roots.Of(square, 2)), nil
}

// DuBois is the surface area after Du Bois 1916, 0.007184 H^0.725 W^0.425 (cm,
// kg), to 40 significant digits, half up. It is worked as the 40th root of
// 0.007184^40 H^29 W^17. Error: *MissingError.
func (s Size) DuBois() (quantity.BodySurfaceArea, error) {
	if err := s.need(duBoisArea, NeedHeight, NeedWeight); err != nil {
		return quantity.BodySurfaceArea{}, err
	}
	r := mul(roots.Power(rat(7184, 1000000), 40), mul(roots.Power(s.Height.Rat(), 29), roots.Power(s.Weight.Rat(), 17)))
	return quantity.SquareMetres(roots.Of(r, 40)), nil
}
