package dilution

import (
	"math/big"
	"slices"

	"drawup/dilution/quantity"
)

// A size is one size of container, of which several may be opened.
type size struct {
	volume quantity.Volume
	most   int // how many there are; unlimited for as many as are needed
}

// unlimited is the number of a thing that is not counted.
const unlimited = -1

// mostStates bounds the search for containers: how many part sums it keeps.
const mostStates = 50000

// A searchCut says that the search was given up at its bound.
type searchCut struct{}

func (*searchCut) Error() string {
	return "there are more ways to put the containers together than are looked at"
}

// A tooFew says that all containers together do not hold enough.
type tooFew struct{ have quantity.Volume }

func (*tooFew) Error() string { return "the containers together hold too little" }

// fewest is how many of each size to open for need, which must be above zero:
//
//  1. as few containers as possible;
//  2. of these ways, the one that leaves least;
//  3. of these, the one of fewest sizes;
//  4. of these, the one that takes most of the size that is listed first, then
//     of the second, and so on.
//
// Since what is left is then less than the smallest container opened, at most
// one container is opened and not used up. Errors: *tooFew, *searchCut.
func fewest(sizes []size, need quantity.Volume) ([]int, error) {
	grid, want, ok := onGrid(sizes, need)
	if !ok {
		return nil, &searchCut{}
	}
	n, err := least(sizes, grid, want)
	if err != nil {
		return nil, err
	}
	if len(sizes) == 1 {
		return []int{n}, nil
	}
	return exactly(sizes, grid, want, n)
}

// onGrid writes all volumes as whole numbers of one small part, rounded by
// nothing; false when that does not fit a machine word.
func onGrid(sizes []size, need quantity.Volume) ([]int64, int64, bool) {
	part := new(big.Int).Set(need.Rat().Denom())
	for _, s := range sizes {
		d := s.volume.Rat().Denom()
		gcd := new(big.Int).GCD(nil, nil, part, d)
		part.Mul(part, new(big.Int).Quo(d, gcd))
	}
	whole := func(v quantity.Volume) (int64, bool) {
		x := new(big.Rat).Mul(v.Rat(), new(big.Rat).SetInt(part))
		return x.Num().Int64(), x.Num().IsInt64() && x.Num().BitLen() < 40
	}
	want, fits := whole(need)
	grid := make([]int64, len(sizes))
	for i, s := range sizes {
		x, ok := whole(s.volume)
		grid[i], fits = x, fits && ok && x > 0
	}
	return grid, want, fits
}

// least is the smallest number of containers that hold want: the largest first.
func least(sizes []size, grid []int64, want int64) (int, error) {
	order := make([]int, len(grid))
	for i := range order {
		order[i] = i
	}
	slices.SortStableFunc(order, func(a, b int) int { return -compare(grid[a], grid[b]) })
	count, left := 0, want
	for _, i := range order {
		n := (left + grid[i] - 1) / grid[i]
		if sizes[i].most != unlimited {
			n = min(n, int64(sizes[i].most))
		}
		if n > 10000 {
			return 0, &searchCut{}
		}
		count, left = count+int(n), left-n*grid[i]
		if left <= 0 {
			return count, nil
		}
	}
	have := new(big.Rat)
	for _, s := range sizes {
		have.Add(have, s.volume.Times(s.most).Rat())
	}
	return 0, &tooFew{have: quantity.Millilitres(have)}
}

func compare(a, b int64) int {
	switch {
	case a < b:
		return -1
	case a > b:
		return 1
	}
	return 0
}

// A partSum is some containers of the first sizes.
type partSum struct {
	count int
	total int64
}

// exactly is the best way to hold want with n containers, n being the least. It
// goes through the sizes one by one and keeps, for each number of containers
// and each total, the best way to it.
func exactly(sizes []size, grid []int64, want int64, n int) ([]int, error) {
	states := map[partSum][]int{{}: {}}
	for i := range sizes {
		next := make(map[partSum][]int, len(states))
		for at, counts := range states {
			most := n - at.count
			if sizes[i].most != unlimited {
				most = min(most, sizes[i].most)
			}
			for k := 0; k <= most; k++ {
				to := partSum{at.count + k, at.total + int64(k)*grid[i]}
				if other, known := next[to]; known && !better(counts, k, other) {
					continue
				}
				next[to] = append(slices.Clone(counts), k)
			}
			if len(next) > mostStates {
				return nil, &searchCut{}
			}
		}
		states = next
	}
	var best []int
	var left int64
	for at, counts := range states {
		if at.count != n || at.total < want {
			continue
		}
		if best == nil || at.total-want < left || at.total-want == left && better(counts[:len(counts)-1], counts[len(counts)-1], best) {
			best, left = counts, at.total-want
		}
	}
	return best, nil
}

// better reports whether counts and k more of the next size go before other, by
// rules 3 and 4 of fewest.
func better(counts []int, k int, other []int) bool {
	kinds, others := used(counts), used(other)
	if k > 0 {
		kinds++
	}
	if kinds != others {
		return kinds < others
	}
	for i, c := range counts {
		if c != other[i] {
			return c > other[i]
		}
	}
	return k > other[len(counts)]
}

func used(counts []int) int {
	n := 0
	for _, c := range counts {
		if c > 0 {
			n++
		}
	}
	return n
}
