package certainty

import "math/big"

// rootDigits is how many decimals a root keeps.
const rootDigits = 12

// rootUp is the root of x, which is not negative, rounded up at the twelfth
// decimal: the smallest multiple of 1e-12 whose square is x or more.
func rootUp(x *big.Rat) *big.Rat {
	scale := new(big.Int).Exp(big.NewInt(10), big.NewInt(rootDigits), nil)
	n := new(big.Int).Mul(x.Num(), new(big.Int).Mul(scale, scale))
	n, rest := n.QuoRem(n, x.Denom(), new(big.Int))
	if rest.Sign() > 0 {
		n.Add(n, big.NewInt(1))
	}
	r := new(big.Int).Sqrt(n)
	if new(big.Int).Mul(r, r).Cmp(n) < 0 {
		r.Add(r, big.NewInt(1))
	}
	return new(big.Rat).SetFrac(r, scale)
}

// expandedSquare is U², with U = 2 u and u² the sum of a²/3 over half widths a
// that are rectangular and independent (GUM 4.3.7, 5.1.2, 6.2.1).
func expandedSquare(widths []*big.Rat) *big.Rat {
	total := new(big.Rat)
	for _, a := range widths {
		total.Add(total, new(big.Rat).Mul(a, a))
	}
	return total.Mul(total, big.NewRat(4, 3))
}
