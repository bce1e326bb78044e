package roots

import "math/big"

// Of is the k-th root of r to 40 significant digits, half up. R must be above
// zero and k 1 or more.
func Of(r *big.Rat, k int) *big.Rat {
	places := 0
	for {
		n := floor(wholeOf(Shifted(r, k*places)), k)
		length := len(n.String())
		if n.Sign() > 0 && length >= Digits {
			places -= length - Digits
			break
		}
		places += Digits - length + 1
	}
	n := HalfUp(Shifted(r, k*places), k)
	return Shifted(new(big.Rat).SetInt(n), -places)
}

// HalfUp is the k-th root of r, not negative, rounded half up to a whole
// number. With m the whole part of twice the root, it is the whole part of
// (m + 1)/2: no rounded root comes in between.
func HalfUp(r *big.Rat, k int) *big.Int {
	x := new(big.Rat).Mul(r, Power(big.NewRat(2, 1), int64(k)))
	m := floor(wholeOf(x), k)
	return m.Rsh(m.Add(m, big.NewInt(1)), 1)
}

// Power is r to the power of n, n not negative.
func Power(r *big.Rat, n int64) *big.Rat {
	e := big.NewInt(n)
	return new(big.Rat).SetFrac(new(big.Int).Exp(r.Num(), e, nil), new(big.Int).Exp(r.Denom(), e, nil))
}

// Shifted is r with the decimal point moved by places, to the right where
// places is above zero.
func Shifted(r *big.Rat, places int) *big.Rat {
	ten := big.NewRat(10, 1)
	if places < 0 {
		return new(big.Rat).Quo(r, Power(ten, int64(-places)))
	}
	return new(big.Rat).Mul(r, Power(ten, int64(places)))
}

// wholeOf is the whole part of r, not negative.
func wholeOf(r *big.Rat) *big.Int { return new(big.Int).Div(r.Num(), r.Denom()) }

// floor is the whole part of the k-th root of n, n not negative, by Newton's
// method from above in whole numbers.
func floor(n *big.Int, k int) *big.Int {
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
