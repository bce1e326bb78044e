package dilution_test

import (
	"fmt"
	"math/big"
	"math/rand/v2"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"drawup/dilution"
	"drawup/dilution/order"
	"drawup/dilution/quantity"
)

// A small shelf in whole numbers: volumes in hundredths of a mL, amounts in
// hundredths of a mg, so that the search below shares no arithmetic with the
// planner.
type smallShelf struct {
	packs   []smallPack
	barrels []smallBarrel
}

type smallPack struct {
	strength, volume int64 // mg/mL; hundredths of a mL
	count            int   // -1: as many as are needed
}

type smallBarrel struct{ nominal, step int64 }

// asShelf writes it as a shelf of the invented drug.
func (s smallShelf) asShelf() (order.Shelf, string) {
	var t strings.Builder
	for _, p := range s.packs {
		count := ""
		if p.count >= 0 {
			count = fmt.Sprint(p.count)
		}
		v := p.volume / 100
		t.WriteString(stocked("drug aa", fmt.Sprintf("ampoule %d mg in %d mL", p.strength*v, v), count))
	}
	for _, b := range s.barrels {
		fmt.Fprintf(&t, "[[barrel]]\nsize = \"%s mL\"\nstep = \"%s mL\"\n", hundredths(b.nominal), hundredths(b.step))
	}
	shelf, faults := order.ReadShelf("shelf.toml", []byte(t.String()))
	if faults.Refused() {
		panic(faults)
	}
	return shelf, t.String()
}

// all is the best way by looking at every one: each strength, each number of each
// container up to five of a size. The key is the rule of choice written out once
// more: off a line or under a fifth, containers, left over in hundredths of a mg,
// sizes, diluted. nil where nothing can be made.
func (s smallShelf) all(amount, final int64) []int64 {
	var best []int64
	for _, strength := range []int64{1, 2, 3} {
		if amount%strength != 0 {
			continue // not a whole number of hundredths: not drawn in this test
		}
		drawn, off, ok := s.read(amount / strength)
		if !ok || final > 0 && drawn > final {
			continue
		}
		holds := drawn
		diluted := int64(0)
		if final > 0 && final != amount/strength {
			holds, diluted = final, 1
		}
		if final > 0 && amount/strength > final || final > 0 && diluted == 0 && drawn != final || !s.held(holds, diluted == 1) {
			continue
		}
		for counts := range s.countings(strength) {
			space, n, sizes := int64(0), int64(0), int64(0)
			for i, c := range counts {
				space += int64(c) * s.packs[i].volume
				n += int64(c)
				if c > 0 {
					sizes++
				}
			}
			if space < drawn || n == 0 {
				continue
			}
			key := []int64{off, n, (space - drawn) * strength, sizes, diluted}
			if best == nil || slices.Compare(key, best) < 0 {
				best = key
			}
		}
	}
	return best
}

// read is the line that a volume is read at, by the rule of measuring written out
// once more: a fifth of the barrel, the nearest line, the smallest, the finest.
// Not below 0.1 mL, not more than 5 % off.
func (s smallShelf) read(v int64) (line, off int64, ok bool) {
	var best []int64
	for _, b := range s.barrels {
		if b.nominal < v {
			continue
		}
		at := (2*v + b.step) / (2 * b.step) * b.step
		under := int64(0)
		if 5*at < b.nominal {
			under = 1
		}
		key := []int64{under, max(at-v, v-at), b.nominal, b.step, at}
		if best == nil || slices.Compare(key, best) < 0 {
			best = key
		}
	}
	if best == nil || v < 10 || best[4] < 10 || 100*best[1] > 5*v {
		return 0, 0, false
	}
	off = best[0]
	if best[1] > 0 {
		off++
	}
	return best[4], off, true
}

// held reports that some barrel holds the final volume, with a line there where
// the syringe is made up.
func (s smallShelf) held(v int64, line bool) bool {
	return slices.ContainsFunc(s.barrels, func(b smallBarrel) bool { return b.nominal >= v && (!line || v%b.step == 0) })
}

// countings is every number of each container of one strength.
func (s smallShelf) countings(strength int64) func(func([]int) bool) {
	return func(yield func([]int) bool) {
		counts := make([]int, len(s.packs))
		for {
			if !yield(counts) {
				return
			}
			i := 0
			for ; i < len(counts); i++ {
				most := 5
				if p := s.packs[i]; p.strength != strength {
					most = 0
				} else if p.count >= 0 {
					most = min(most, p.count)
				}
				if counts[i] < most {
					counts[i]++
					break
				}
				counts[i] = 0
			}
			if i == len(counts) {
				return
			}
		}
	}
}

// What the planner takes is never worse than the best of all ways, each looked
// at, on small shelves; and it refuses only where there is no way.
func TestPlannerAgainstAllWays(t *testing.T) {
	f := inventedFormulary(t, 1, 3, 1, 2, 5, 10)
	planned, refused, mixed := 0, 0, 0
	rapid.Check(t, func(t *rapid.T) {
		r := rand.New(rand.NewPCG(rapid.Uint64().Draw(t, "seed"), 17))
		s := randomSmallShelf(r)
		shelf, text := s.asShelf()
		for range 10 {
			amount := 6 * int64(1+r.IntN(300))
			final := []int64{0, 0, 500, 1000, 2000}[r.IntN(5)]
			y := order.Syringe{Drug: order.Field[string]{Value: "drug aa", Text: "drug aa"}, Amount: field(hundredths(amount)+" mg", quantity.ParseAmount)}
			if final > 0 {
				y.Volume = field(hundredths(final)+" mL", quantity.ParseVolume)
			}
			p, reasons := planOne(&shelf, f, y)
			best := s.all(amount, final)
			what := func() string {
				return fmt.Sprintf("%s mg in %s mL (0: neat) from\n%s", hundredths(amount), hundredths(final), text)
			}
			if p == nil {
				refused++
				if best != nil {
					t.Fatalf("%s: refused, and it can be made: %v\n%v", what(), best, reasons.Refusals())
				}
				continue
			}
			planned++
			if p.Mixture.Mixed() {
				mixed++
			}
			if got := keyOfPlan(*p); best != nil && slices.Compare(got, best) > 0 {
				t.Fatalf("%s: got %v, the best is %v", what(), got, best)
			}
		}
	})
	t.Logf("%d planned, %d of them of several sizes, %d refused", planned, mixed, refused)
	if planned < 200 || mixed < 10 || refused < 20 {
		t.Error("too few of a kind to mean something")
	}
}

func randomSmallShelf(r *rand.Rand) smallShelf {
	var s smallShelf
	for _, strength := range []int64{1, 2, 3} {
		for _, v := range []int64{100, 200, 500, 1000} {
			if r.IntN(3) == 0 && len(s.packs) < 4 {
				s.packs = append(s.packs, smallPack{strength, v, []int{-1, -1, 1, 2}[r.IntN(4)]})
			}
		}
	}
	if len(s.packs) == 0 {
		s.packs = []smallPack{{1, 500, -1}}
	}
	for _, b := range []smallBarrel{{100, 1}, {200, 10}, {500, 20}, {500, 50}, {1000, 20}, {1000, 50}, {2000, 100}} {
		if r.IntN(2) == 0 {
			s.barrels = append(s.barrels, b)
		}
	}
	if len(s.barrels) == 0 {
		s.barrels = []smallBarrel{{1000, 20}}
	}
	return s
}

// keyOfPlan is the rule of choice on a plan.
func keyOfPlan(p dilution.Plan) []int64 {
	m := p.Mixture
	off := int64(0)
	if m.DrugReading.MovedPercent.Sign() != 0 {
		off++
	}
	if m.DrugReading.UnderFifth {
		off++
	}
	left := new(big.Rat).Mul(m.LeftAmount.Rat(), big.NewRat(100, 1))
	diluted := int64(0)
	if m.Method != dilution.Neat {
		diluted = 1
	}
	return []int64{off, int64(m.Containers), new(big.Int).Quo(left.Num(), left.Denom()).Int64(), int64(len(m.Packs)), diluted}
}
