package dilution

import (
	"errors"
	"fmt"
	"math/big"
	"slices"
	"testing"

	"pgregory.net/rapid"

	"drawup/dilution/quantity"
)

func volumeOf(r *big.Rat) quantity.Volume { return quantity.Millilitres(r) }

// Worked by hand: fewest containers, then least left, then fewest sizes, then
// the size listed first.
func TestFewest(t *testing.T) {
	const many = unlimited
	for _, c := range []struct {
		need  int64
		sizes []int64
		most  []int
		want  []int
	}{
		{7, []int64{5}, []int{many}, []int{2}},
		{10, []int64{5}, []int{many}, []int{2}},
		{7, []int64{10, 5}, []int{many, many}, []int{1, 0}},                // 3 left of one, not two of 5
		{7, []int64{5, 10}, []int{many, many}, []int{0, 1}},                // whatever the order
		{12, []int64{10, 5}, []int{many, many}, []int{1, 1}},               // 3 left, not 8
		{40, []int64{20, 30, 10}, []int{many, many, many}, []int{2, 0, 0}}, // one size, not two
		{40, []int64{30, 10, 20}, []int{many, many, many}, []int{0, 0, 2}},
		{10, []int64{10, 10}, []int{many, many}, []int{1, 0}}, // as listed
		{25, []int64{10, 5}, []int{1, many}, []int{1, 3}},     // one of 10 is left on the shelf
		{25, []int64{10, 5}, []int{2, 1}, []int{2, 1}},
	} {
		var sizes []size
		for i, v := range c.sizes {
			sizes = append(sizes, size{volumeOf(big.NewRat(v, 1)), c.most[i]})
		}
		got, err := fewest(sizes, volumeOf(big.NewRat(c.need, 1)))
		if err != nil || !slices.Equal(got, c.want) {
			t.Errorf("%d of %v: got %v, %v, want %v", c.need, c.sizes, got, err, c.want)
		}
	}
}

// Too little on the shelf, and a search without end, are errors of their own.
func TestFewestGivesUp(t *testing.T) {
	var few *tooFew
	_, err := fewest([]size{{volumeOf(big.NewRat(10, 1)), 2}, {volumeOf(big.NewRat(5, 1)), 1}}, volumeOf(big.NewRat(26, 1)))
	if !errors.As(err, &few) || few.have.Exact() != "25" {
		t.Errorf("got %v, want 25 mL at most", err)
	}
	var cut *searchCut
	if _, err := fewest([]size{{volumeOf(big.NewRat(1, 1000)), unlimited}}, volumeOf(big.NewRat(50, 1))); !errors.As(err, &cut) {
		t.Errorf("50,000 containers: got %v", err)
	}
	var sizes []size
	for i := range int64(30) { // thirty sizes with nothing in common
		sizes = append(sizes, size{volumeOf(big.NewRat(1000003+i*i*7919, 10000000)), unlimited})
	}
	if _, err := fewest(sizes, volumeOf(big.NewRat(50, 1))); !errors.As(err, &cut) {
		t.Errorf("thirty sizes: got %v", err)
	}
}

// The way that is taken is never worse than any other, each looked at: small
// shelves, all ways of up to six containers.
func TestFewestAgainstAll(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		k := rapid.IntRange(1, 4).Draw(t, "sizes")
		sizes, volumes := make([]size, k), make([]int64, k)
		for i := range sizes {
			volumes[i] = rapid.Int64Range(1, 12).Draw(t, "volume")
			sizes[i] = size{volumeOf(big.NewRat(volumes[i], 2)), rapid.SampledFrom([]int{unlimited, 1, 2, 3}).Draw(t, "count")}
		}
		need := rapid.Int64Range(1, 40).Draw(t, "need")
		got, err := fewest(sizes, volumeOf(big.NewRat(need, 2)))
		best := allWays(sizes, volumes, need, 6)
		if err != nil {
			var few *tooFew
			if errors.As(err, &few) && best == nil {
				return
			}
			t.Fatalf("%d of %v: got %v, want %v", need, volumes, err, best)
		}
		if best == nil && total(got, []int64{1, 1, 1, 1}) > 6 {
			return // more containers than the slow way looks at
		}
		if fmt.Sprint(got) != fmt.Sprint(best) {
			t.Fatalf("%d of %v: got %v, want %v", need, volumes, got, best)
		}
	})
}

// allWays looks at every way of at most n containers and keeps the best, by the
// four rules written out once more.
func allWays(sizes []size, volumes []int64, need int64, n int) []int {
	var best []int
	counts := make([]int, len(sizes))
	for {
		i := 0
		for ; i < len(counts); i++ {
			counts[i]++
			if counts[i] <= n && (sizes[i].most == unlimited || counts[i] <= sizes[i].most) {
				break
			}
			counts[i] = 0
		}
		if i == len(counts) {
			return best
		}
		if containers := total(counts, []int64{1, 1, 1, 1}); containers > int64(n) || total(counts, volumes) < need {
			continue
		}
		if best == nil || slices.Compare(keyOf(counts, volumes), keyOf(best, volumes)) < 0 {
			best = slices.Clone(counts)
		}
	}
}

func keyOf(counts []int, volumes []int64) []int64 {
	kinds := int64(0)
	key := []int64{total(counts, []int64{1, 1, 1, 1}), total(counts, volumes), 0}
	for _, c := range counts {
		if c > 0 {
			kinds++
		}
		key = append(key, -int64(c))
	}
	key[2] = kinds
	return key
}

func total(counts []int, each []int64) int64 {
	sum := int64(0)
	for i, c := range counts {
		sum += int64(c) * each[i]
	}
	return sum
}
