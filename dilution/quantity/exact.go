package quantity

import (
	"math/big"
	"strings"
)

// exact is a fraction that never changes after it is made. A nil fraction
// means "not given"; what is worked from it is not given either.
type exact struct {
	_ [0]func() // forbids ==
	r *big.Rat
}

func whole(n int64) exact       { return exact{r: new(big.Rat).SetInt64(n)} }
func fraction(a, b int64) exact { return exact{r: big.NewRat(a, b)} }
func (x exact) given() bool     { return x.r != nil }

// fromRat copies r, so that nobody can change it later.
func fromRat(r *big.Rat) exact {
	if r == nil {
		return exact{}
	}
	return exact{r: new(big.Rat).Set(r)}
}

// notNegative copies r; a negative r is not given.
func notNegative(r *big.Rat) exact {
	if r == nil || r.Sign() < 0 {
		return exact{}
	}
	return fromRat(r)
}

func (x exact) copyRat() *big.Rat { return fromRat(x.r).r }

// with works op on x and y if both are given.
func (x exact) with(y exact, op func(z, a, b *big.Rat) *big.Rat) exact {
	if !x.given() || !y.given() {
		return exact{}
	}
	return exact{r: op(new(big.Rat), x.r, y.r)}
}

func (x exact) mul(y exact) exact { return x.with(y, (*big.Rat).Mul) }
func (x exact) add(y exact) exact { return x.with(y, (*big.Rat).Add) }
func (x exact) sub(y exact) exact { return x.with(y, (*big.Rat).Sub) }

// quo is x divided by y; nothing divided by zero is given.
func (x exact) quo(y exact) exact {
	if y.given() && y.sign() == 0 {
		return exact{}
	}
	return x.with(y, (*big.Rat).Quo)
}

// cmp and sign want values that are given.
func (x exact) cmp(y exact) int { return x.r.Cmp(y.r) }
func (x exact) sign() int       { return x.r.Sign() }

// positive reports a given value above zero.
func (x exact) positive() bool { return x.given() && x.sign() > 0 }

// floorDiv is how many whole times y, above zero, goes into x, rounded down.
func (x exact) floorDiv(y exact) *big.Int {
	q := new(big.Rat).Quo(x.r, y.r)
	return new(big.Int).Div(q.Num(), q.Denom())
}

// A Direction says which way a step rounds.
type Direction int

// Directions of rounding. The zero value is refused.
const (
	HalfUp Direction = iota + 1 // the nearest step, a tie goes up (rule R2)
	Up                          // the next step that is not smaller
	Down                        // the next step that is not larger
)

// toStep moves x to a multiple of step. It is the only place where a value is
// rounded on its way to a syringe or a pump.
func (x exact) toStep(step exact, d Direction) (exact, error) {
	if !x.given() {
		return exact{}, &NotGivenError{What: "a value to round"}
	}
	if !step.positive() {
		return exact{}, &NotGivenError{What: "a step above zero"}
	}
	// x is count/of steps, both whole numbers and of above zero: no fraction is
	// brought to lowest terms on the way.
	count := new(big.Int).Mul(x.r.Num(), step.r.Denom())
	of := new(big.Int).Mul(x.r.Denom(), step.r.Num())
	switch d {
	case HalfUp: // the whole part of count/of and a half
		count.Add(count.Lsh(count, 1), of)
		count.Div(count, of.Lsh(of, 1))
	case Down:
		count.Div(count, of)
	case Up:
		count.Neg(count.Div(count.Neg(count), of))
	default:
		return exact{}, &NotGivenError{What: "a rounding direction"}
	}
	return exact{r: new(big.Rat).SetFrac(count.Mul(count, step.r.Num()), step.r.Denom())}, nil
}

// decimal gives the terminating decimal text of x, or false.
func (x exact) decimal() (string, bool) {
	places, ok := x.places()
	if !ok {
		return "", false
	}
	return trimZeros(x.r.FloatString(places)), true
}

// places counts the decimals that x needs; false if it never ends.
func (x exact) places() (int, bool) {
	den := new(big.Int).Set(x.r.Denom())
	two, five := factorOut(den, 2), factorOut(den, 5)
	if den.Cmp(big.NewInt(1)) != 0 {
		return 0, false
	}
	return max(two, five), true
}

// factorOut divides n, above zero, by p as often as it goes and counts how often.
func factorOut(n *big.Int, p int64) int {
	count, prime, rest := 0, big.NewInt(p), new(big.Int)
	for {
		q, m := new(big.Int).QuoRem(n, prime, rest)
		if m.Sign() != 0 {
			return count
		}
		n.Set(q)
		count++
	}
}

// text is the exact value in full: a decimal if it ends, else a fraction in
// lowest terms such as "28/3". It is "" if nothing is given.
func (x exact) text() string {
	if !x.given() {
		return ""
	}
	if s, ok := x.decimal(); ok {
		return s
	}
	return x.r.RatString()
}

// trimZeros drops zeros after the last digit that counts behind a point.
func trimZeros(s string) string {
	if !strings.Contains(s, ".") {
		return s
	}
	return strings.TrimSuffix(strings.TrimRight(s, "0"), ".")
}
