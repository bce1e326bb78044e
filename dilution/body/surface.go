package body

import (
	"math/big"

	"drawup/dilution/quantity"
)

// significantDigits is how far a root is worked before it is rounded once
// (rule R1).
const significantDigits = 40

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
	return quantity.SquareMetres(root(square, 2)), nil
}

// DuBois is the surface area after Du Bois 1916, 0.007184 H^0.725 W^0.425 (cm,
// kg), to 40 significant digits, half up. It is worked as the 40th root of
// 0.007184^40 H^29 W^17. Error: *MissingError.
func (s Size) DuBois() (quantity.BodySurfaceArea, error) {
	if err := s.need(duBoisArea, NeedHeight, NeedWeight); err != nil {
		return quantity.BodySurfaceArea{}, err
	}
	r := mul(power(rat(7184, 1000000), 40), mul(power(s.Height.Rat(), 29), power(s.Weight.Rat(), 17)))
	return quantity.SquareMetres(root(r, 40)), nil
}

// power is r to the power of n, n not negative.
func power(r *big.Rat, n int64) *big.Rat {
	e := big.NewInt(n)
	return new(big.Rat).SetFrac(new(big.Int).Exp(r.Num(), e, nil), new(big.Int).Exp(r.Denom(), e, nil))
}

// root is the k-th root of r, above zero, to 40 significant digits, half up.
func root(r *big.Rat, k int) *big.Rat {
	places := 0
	for {
		n := rootFloor(shifted(r, k*places), k)
		length := len(n.String())
		if n.Sign() > 0 && length >= significantDigits {
			places -= length - significantDigits
			break
		}
		places += significantDigits - length + 1
	}
	n := rootHalfUp(shiftedRat(r, k*places), k)
	return shiftedRat(new(big.Rat).SetInt(n), -places)
}

// shiftedRat is r with the decimal point moved by places, to the right where
// places is above zero.
func shiftedRat(r *big.Rat, places int) *big.Rat {
	if places < 0 {
		return quo(r, power(rat(10, 1), int64(-places)))
	}
	return mul(r, power(rat(10, 1), int64(places)))
}

// shifted is the whole part of shiftedRat.
func shifted(r *big.Rat, places int) *big.Int {
	x := shiftedRat(r, places)
	return new(big.Int).Div(x.Num(), x.Denom())
}

// rootHalfUp is the k-th root of r rounded half up to a whole number. With m
// the whole part of twice the root, it is the whole part of (m + 1)/2: no
// rounded root comes in between.
func rootHalfUp(r *big.Rat, k int) *big.Int {
	x := mul(r, power(rat(2, 1), int64(k)))
	m := rootFloor(new(big.Int).Div(x.Num(), x.Denom()), k)
	return m.Rsh(m.Add(m, big.NewInt(1)), 1)
}

// rootFloor is the whole part of the k-th root of n, n not negative, by
// Newton's method from above in whole numbers.
func rootFloor(n *big.Int, k int) *big.Int {
	if n.Sign() == 0 {
		return new(big.Int)
	}
	less, times := big.NewInt(int64(k-1)), big.NewInt(int64(k))
	x := new(big.Int).Lsh(big.NewInt(1), uint(n.BitLen()/k+1))
	for {
		y := new(big.Int).Quo(n, new(big.Int).Exp(x, less, nil))
		y.Add(y, new(big.Int).Mul(less, x)).Quo(y, times)
		if y.Cmp(x) >= 0 {
			return x
		}
		x = y
	}
}
