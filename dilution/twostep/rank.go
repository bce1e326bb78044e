package twostep

import (
	"cmp"
	"math"
	"math/big"
	"slices"
)

// A Reason says by what one preparation loses to another. The zero value is
// none.
type Reason int

// Reasons, in the order in which preparations are held against each other.
const (
	FartherOff     Reason = iota + 1 // the concentration is farther from the target
	WiderInterval                    // the four readings leave a wider worst case
	MoreWaste                        // more drug is left in the intermediate syringe
	LargerSyringes                   // the syringes hold more in all
	TieRule                          // all alike: smaller intermediate, then less drawn, then less taken on
)

// String is the reason in words.
func (r Reason) String() string {
	switch r {
	case FartherOff:
		return "farther from the target"
	case WiderInterval:
		return "wider interval"
	case MoreWaste:
		return "more drug wasted"
	case LargerSyringes:
		return "larger syringes"
	case TieRule:
		return "alike in all, larger volumes"
	}
	return ""
}

// A candidate is drawn, made up to, taken on; the giving syringe is fixed. Its
// drug, as volume of the strength, is product / made.n units.
type candidate struct {
	drawn, made, taken *volume
	product            int64 // drawn.n x taken.n
}

func (c *candidate) given() bool { return c.made != nil }

// An order is the reasons, most important first.
type order [5]Reason

func bestOrder() order { return order{FartherOff, WiderInterval, MoreWaste, LargerSyringes, TieRule} }

// A side is whether candidates hold the target or less, or more than it. On one
// side the errors compare as whole numbers, without the target.
type side int

const (
	below side = iota
	above
)

// compare holds a against b, both on one side: -1 if a is better, with the
// reason by which the other loses.
func (o *order) compare(a, b *candidate, s side) (int, Reason) {
	for _, r := range o {
		var n int
		if r == FartherOff {
			n = cmp.Compare(b.product*a.made.n, a.product*b.made.n) // below, the larger is nearer
			if s == above {
				n = -n
			}
		} else {
			n = compareBy(r, a, b)
		}
		if n != 0 {
			return n, r
		}
	}
	return 0, 0
}

// across is compare for candidates of any sides, with need the exact drug in
// units.
func (o *order) across(a, b *candidate, need *big.Rat) (int, Reason) {
	for _, r := range o {
		n := 0
		if r == FartherOff {
			n = a.off(need).Cmp(b.off(need))
		} else {
			n = compareBy(r, a, b)
		}
		if n != 0 {
			return n, r
		}
	}
	return 0, 0
}

// compareBy is compare for every reason but the error.
func compareBy(r Reason, a, b *candidate) int {
	switch r {
	case WiderInterval:
		return compareSpread(a, b)
	case MoreWaste:
		return cmp.Compare(a.drawn.n*(a.made.n-a.taken.n)*b.made.n, b.drawn.n*(b.made.n-b.taken.n)*a.made.n)
	case LargerSyringes:
		return cmp.Compare(a.capacity(), b.capacity())
	case TieRule:
		return cmp.Or(cmp.Compare(a.made.n, b.made.n), cmp.Compare(a.drawn.n, b.drawn.n), cmp.Compare(a.taken.n, b.taken.n))
	case FartherOff:
	}
	return 0
}

// off is how far the drug is off need, in units, without its sign.
func (c *candidate) off(need *big.Rat) *big.Rat {
	d := big.NewRat(c.product, c.made.n)
	return d.Abs(d.Sub(d, need))
}

func (c *candidate) capacity() int64 { return c.drawn.nominal + c.made.nominal + c.taken.nominal }

// compareSpread compares the products of the three ratios. Their whole parts
// settle most pairs; what they leave open is worked exactly.
func compareSpread(a, b *candidate) int {
	switch {
	case a.low() >= b.high():
		return 1
	case b.low() >= a.high():
		return -1
	case a.ranks() == b.ranks():
		return 0
	}
	return a.spread().Cmp(b.spread())
}

// low is at most, high above, the product of the ratios, in 48 binary places.
func (c *candidate) low() uint64 { return c.drawn.floor * c.made.floor * c.taken.floor }
func (c *candidate) high() uint64 {
	return (c.drawn.floor + 1) * (c.made.floor + 1) * (c.taken.floor + 1)
}

// ranks are those of the three ratios in rising order: the same ranks, the same
// product.
func (c *candidate) ranks() [3]int {
	r := [3]int{c.drawn.rank, c.made.rank, c.taken.rank}
	slices.Sort(r[:])
	return r
}

func (c *candidate) spread() *big.Rat {
	x := new(big.Rat).Mul(c.drawn.ratio, c.made.ratio)
	return x.Mul(x, c.taken.ratio)
}

// A shortlist keeps the best two of each side by one order.
type shortlist struct {
	by   order
	best [2][2]candidate
}

// offer keeps c if it is among the best two of its side. Most are worse than
// both, so the second is asked first.
func (l *shortlist) offer(c *candidate, s side) {
	kept := &l.best[s]
	switch {
	case kept[1].given() && !l.better(c, &kept[1], s):
	case kept[0].given() && !l.better(c, &kept[0], s):
		kept[1] = *c
	default:
		kept[0], kept[1] = *c, kept[0]
	}
}

func (l *shortlist) better(a, b *candidate, s side) bool {
	n, _ := l.by.compare(a, b, s)
	return n < 0
}

// ceiling is above the floors of every spread that can still win on a side.
func (l *shortlist) ceiling(s side) uint64 {
	if !l.best[s][0].given() {
		return math.MaxUint64
	}
	return l.best[s][0].high()
}

// sorted is what is kept, the best first, both sides held against need.
func (l *shortlist) sorted(need *big.Rat) []candidate {
	var out []candidate
	for _, s := range l.best {
		for _, c := range s {
			if c.given() {
				out = append(out, c)
			}
		}
	}
	slices.SortFunc(out, func(a, b candidate) int {
		n, _ := l.by.across(&a, &b, need)
		return n
	})
	return out
}
