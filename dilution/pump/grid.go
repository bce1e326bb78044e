package pump

import "math/big"

// A grid is the multiples of spacing between two ends.
type grid struct {
	spacing *big.Rat
	first   *big.Int // the lowest rung is first x spacing
	count   int64
	ends    int // how many of the two ends are rungs
}

// bestGrid tries every round spacing that can give 6 to 12 rungs. With p the
// power of ten of the span, those lie above p/13 and not above 2 p.
func bestGrid(low, high *big.Rat, rungs int64) (grid, bool) {
	p := powerOfTen(new(big.Rat).Sub(high, low))
	var best grid
	for _, share := range []*big.Rat{
		big.NewRat(1, 10), big.NewRat(2, 10), big.NewRat(1, 4), big.NewRat(5, 10), big.NewRat(1, 1), big.NewRat(2, 1),
	} {
		g := gridOf(new(big.Rat).Mul(p, share), low, high)
		if g.count < FewestRungs || g.count > MostRungs || !g.printable() {
			continue
		}
		if best.spacing == nil || g.better(best, rungs) {
			best = g
		}
	}
	return best, best.spacing != nil
}

// powerOfTen is the largest power of ten that is not above r, r above zero.
func powerOfTen(r *big.Rat) *big.Rat {
	p, ten := big.NewRat(1, 1), big.NewRat(10, 1)
	for p.Cmp(r) > 0 {
		p.Quo(p, ten)
	}
	for next := new(big.Rat).Mul(p, ten); next.Cmp(r) <= 0; next = new(big.Rat).Mul(p, ten) {
		p = next
	}
	return p
}

func gridOf(spacing, low, high *big.Rat) grid {
	from, to := new(big.Rat).Quo(low, spacing), new(big.Rat).Quo(high, spacing)
	last := new(big.Int).Div(to.Num(), to.Denom())
	first := new(big.Int).Div(from.Num(), from.Denom())
	g := grid{spacing: spacing, first: first}
	if from.IsInt() {
		g.ends++
	} else {
		first.Add(first, big.NewInt(1))
	}
	if to.IsInt() {
		g.ends++
	}
	g.count = new(big.Int).Sub(last, first).Int64() + 1 // a span holds at most 101 spacings
	return g
}

// rung is the n-th dose rate from below, from 0.
func (g grid) rung(n int64) *big.Rat {
	at := new(big.Rat).SetInt(new(big.Int).Add(g.first, big.NewInt(n)))
	return at.Mul(at, g.spacing)
}

// better reports whether g suits more than h where rungs are wanted.
func (g grid) better(h grid, rungs int64) bool {
	if g.ends != h.ends {
		return g.ends > h.ends
	}
	far, other := distance(g.count, rungs), distance(h.count, rungs)
	if far != other {
		return far < other
	}
	return g.spacing.Cmp(h.spacing) < 0
}

func distance(a, b int64) int64 { return max(a-b, b-a) }

// printable reports whether every rung needs at most four significant digits.
func (g grid) printable() bool {
	for n := int64(0); n < g.count; n++ {
		if !fourDigits(g.rung(n)) {
			return false
		}
	}
	return true
}

// fourDigits reports whether r, a decimal that ends, needs no more than four
// significant digits.
func fourDigits(r *big.Rat) bool {
	ten := big.NewRat(10, 1)
	x := new(big.Rat).Set(r)
	for !x.IsInt() {
		x.Mul(x, ten)
	}
	for y := new(big.Rat).Quo(x, ten); y.IsInt() && y.Sign() > 0; y = new(big.Rat).Quo(x, ten) {
		x = y
	}
	return x.Cmp(big.NewRat(10000, 1)) < 0
}
