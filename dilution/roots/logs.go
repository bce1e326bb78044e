package roots

import "math/big"

// Powers with a broken exponent go through natural logarithms. These are whole
// numbers of 10^-guard: each step of a series cuts off less than one of them,
// no series here has more than 200 steps, and no logarithm passes a few dozens,
// so that more than 30 digits beyond the 40 stay right.
const guard = 80

// unit is 1 as a whole number of 10^-guard.
func unit() *big.Int { return new(big.Int).Exp(big.NewInt(10), big.NewInt(guard), nil) }

// A Log is the natural logarithm of a number above zero, to about 76 decimals.
// Its zero value is the logarithm of one.
type Log struct{ n *big.Int }

func (l Log) value() *big.Int {
	if l.n == nil {
		return new(big.Int)
	}
	return l.n
}

// LogOf is the natural logarithm of r, above zero.
func LogOf(r *big.Rat) Log {
	m, twos := new(big.Rat).Set(r), int64(0)
	for half := big.NewRat(1, 2); m.Cmp(big.NewRat(4, 3)) > 0; twos++ {
		m.Mul(m, half)
	}
	for two := big.NewRat(2, 1); m.Cmp(big.NewRat(2, 3)) < 0; twos-- {
		m.Mul(m, two)
	}
	one := big.NewRat(1, 1)
	near := artanh2(new(big.Rat).Quo(new(big.Rat).Sub(m, one), new(big.Rat).Add(m, one)))
	return Log{near.Add(near, new(big.Int).Mul(log2(), big.NewInt(twos)))}
}

// log2 is the logarithm of 2.
func log2() *big.Int { return artanh2(big.NewRat(1, 3)) }

// artanh2 is twice the inverse hyperbolic tangent of z: 2 (z + z³/3 + z⁵/5 + …),
// the logarithm of (1 + z)/(1 - z). Z is 1/3 or less, of either sign.
func artanh2(z *big.Rat) *big.Int {
	one := unit()
	fixed := func(r *big.Rat) *big.Int {
		return new(big.Int).Quo(new(big.Int).Mul(r.Num(), one), r.Denom())
	}
	term, square := fixed(z), fixed(new(big.Rat).Mul(z, z))
	sum := new(big.Int)
	for k := int64(1); term.Sign() != 0; k += 2 {
		sum.Add(sum, new(big.Int).Quo(term, big.NewInt(k)))
		term.Quo(term.Mul(term, square), one)
	}
	return sum.Lsh(sum, 1)
}

// Plus is the logarithm of the product.
func (l Log) Plus(m Log) Log { return Log{new(big.Int).Add(l.value(), m.value())} }

// Times is the logarithm of the number to the power of r.
func (l Log) Times(r *big.Rat) Log {
	x := new(big.Int).Mul(l.value(), r.Num())
	return Log{x.Quo(x, r.Denom())}
}

// Over is l divided by m, which must not be zero: the logarithm to another base.
func (l Log) Over(m Log) *big.Rat { return new(big.Rat).SetFrac(l.value(), m.value()) }

// Number is the number whose logarithm l is, to 40 significant digits, half up.
func (l Log) Number() *big.Rat {
	one, two := unit(), log2()
	twos := new(big.Int).Div(l.value(), two)
	rest := new(big.Int).Sub(l.value(), new(big.Int).Mul(twos, two))
	sum, term := new(big.Int).Set(one), new(big.Int).Set(one)
	for k := int64(1); term.Sign() != 0; k++ { // 1 + x + x²/2! + …, x under log 2
		term.Quo(term.Mul(term, rest), one)
		term.Quo(term, big.NewInt(k))
		sum.Add(sum, term)
	}
	x := new(big.Rat).SetFrac(sum, one)
	if twos.Sign() < 0 {
		x.Quo(x, Power(big.NewRat(2, 1), -twos.Int64()))
	} else {
		x.Mul(x, Power(big.NewRat(2, 1), twos.Int64()))
	}
	return Of(x, 1)
}
