package twostep

import (
	"cmp"
	"math"
	"math/big"
	"slices"
	"sort"
)

// bound is how many intermediate dilutions a search weighs at most; our own
// choice, so that it stays under a hundredth of a second.
const bound = 30_000

// A search weighs every way to draw and make up, and of each intermediate what
// may be taken on: the two volumes that come nearest, and what within the
// tolerance leaves the narrowest interval or the least waste.
type search struct {
	grid
	final             int64    // the final volume
	need, least, most *big.Rat // drug wanted, and the ends of the tolerance, as volume of the strength
	low, high         *big.Rat // of the intermediate, as a share of the strength; nil: none

	nearest, narrowest, thrifty shortlist
	narrow                      uint64 // a spread that can no longer be the narrowest
	weighed                     int
	bounded                     bool
}

// run fills the shortlists. What is made up to comes in the order of how surely
// it is read, so that a search that is cut short leaves out the worst readings.
func (s *search) run() {
	s.nearest.by = bestOrder()
	s.narrowest.by = order{WiderInterval, FartherOff, MoreWaste, LargerSyringes, TieRule}
	s.thrifty.by = order{MoreWaste, FartherOff, WiderInterval, LargerSyringes, TieRule}
	s.narrow = math.MaxUint64
	made := make([]*volume, len(s.volumes))
	for i := range s.volumes {
		made[i] = &s.volumes[i]
	}
	slices.SortFunc(made, func(a, b *volume) int { return cmp.Or(cmp.Compare(a.rank, b.rank), cmp.Compare(a.n, b.n)) })
	for _, m := range made {
		if !s.makeUpTo(m) {
			s.bounded = true
			return
		}
	}
}

// A window holds the products of drawn and taken, in square units, for one
// made-up volume: up to exact holds the target or less, from least to most
// comes within the tolerance.
type window struct{ exact, least, most int64 }

func (s *search) window(made int64) window {
	return window{floor(s.need, made), max(1, ceiling(s.least, made)), floor(s.most, made)}
}

// floor is the largest whole number up to n times r, ceiling the smallest from
// n times r. Whatever is compared with them is whole.
func floor(r *big.Rat, n int64) int64 {
	x := big.NewInt(n)
	return x.Div(x.Mul(x, r.Num()), r.Denom()).Int64()
}

func ceiling(r *big.Rat, n int64) int64 { return -floor(r, -n) }

// makeUpTo weighs everything that is made up to one volume; false at the bound.
func (s *search) makeUpTo(made *volume) bool {
	w := s.window(made.n)
	// What is taken on leaves something behind, and leaves room for diluent.
	top := s.first(min(made.n, s.final))
	if top == 0 {
		return true
	}
	at := top - 1 // the largest that with what is drawn holds the target or less
	least, most := s.drawn(made.n)
	for i := s.first(least); i < len(s.volumes) && s.volumes[i].n <= most; i++ {
		drawn := &s.volumes[i]
		for at >= 0 && drawn.n*s.volumes[at].n > w.exact {
			at--
		}
		if !s.take(drawn, made, at, top, w) {
			return false
		}
		if drawn.n*s.volumes[0].n > w.most {
			break // the least that can be taken is too much, and more so with more drawn
		}
	}
	return true
}

// first is the index of the first volume of n units or more.
func (s *search) first(n int64) int {
	return sort.Search(len(s.volumes), func(i int) bool { return s.volumes[i].n >= n })
}

// drawn is the least and the most that may be drawn, by the bounds of the
// intermediate; some diluent there must be.
func (s *search) drawn(made int64) (least, most int64) {
	most = made - 1
	if s.low != nil {
		least = ceiling(s.low, made)
	}
	if s.high != nil && s.high.Cmp(big.NewRat(1, 1)) < 0 {
		most = min(most, floor(s.high, made))
	}
	return least, most
}

// take weighs what may be taken on of one intermediate; false at the bound. At
// is the largest volume below top that holds the target or less, -1 if none.
func (s *search) take(drawn, made *volume, at, top int, w window) bool {
	if s.weighed == bound {
		return false
	}
	s.weighed++
	for i := max(at, 0); i <= min(at+1, top-1); i++ {
		s.offer(&s.nearest, drawn, made, i, w)
	}
	from, to := at, at
	for from > 0 && drawn.n*s.volumes[from-1].n >= w.least {
		from--
	}
	for to+1 < top && drawn.n*s.volumes[to+1].n <= w.most {
		to++
	}
	if from < 0 || drawn.n*s.volumes[from].n < w.least {
		from++
	}
	if from > to {
		return true
	}
	s.offer(&s.thrifty, drawn, made, to, w) // the more is taken on, the less is left
	pair := drawn.floor * made.floor
	for i := from; i <= to; i++ {
		if pair*s.volumes[i].floor < s.narrow {
			s.offer(&s.narrowest, drawn, made, i, w)
		}
	}
	return true
}

// offer puts one preparation on a shortlist.
func (s *search) offer(l *shortlist, drawn, made *volume, i int, w window) {
	c := candidate{drawn, made, &s.volumes[i], drawn.n * s.volumes[i].n}
	where := below
	if c.product > w.exact {
		where = above
	}
	l.offer(&c, where)
	if l == &s.narrowest {
		s.narrow = max(l.ceiling(below), l.ceiling(above))
	}
}
