package twostep

import (
	"errors"
	"math/big"
	"testing"

	"drawup/dilution/quantity"
	"drawup/dilution/syringe"

	"pgregory.net/rapid"
)

// A made is one preparation of the exhaustive search: the figures that it is
// judged by, in the order that the package comment states. How far off, spread,
// drug left, capacities, made up to, drawn, taken.
type made [7]*big.Rat

// Orders of judging, as places in a made: as the package comment says, the
// narrowest first, the least waste first.
var byRule, byInterval, byWaste = []int{0, 1, 2, 3, 4, 5, 6}, []int{1, 0, 2, 3, 4, 5, 6}, []int{2, 0, 1, 3, 4, 5, 6}

func (m made) before(o made, order []int) bool {
	for _, i := range order {
		if n := m[i].Cmp(o[i]); n != 0 {
			return n < 0
		}
	}
	return false
}

func (m made) same(o made) bool { return !m.before(o, byRule) && !o.before(m, byRule) }

// A line is one graduation of one barrel.
type line struct{ volume, ratio, nominal *big.Rat }

// linesOf lists every graduation of every barrel that is worth reading.
func linesOf(barrels []syringe.Barrel, smallest quantity.Volume) []line {
	var out []line
	for _, b := range barrels {
		for v := b.Step(); v.Cmp(b.Nominal()) <= 0; v = v.Plus(b.Step()) {
			x, t := v.Rat(), b.Tolerance(v).Rat()
			if v.Cmp(smallest) < 0 || t.Cmp(new(big.Rat).Mul(x, big.NewRat(9, 10))) > 0 {
				continue
			}
			high, low := new(big.Rat).Add(x, t), new(big.Rat).Sub(x, t)
			out = append(out, line{x, high.Quo(high, low), b.Nominal().Rat()})
		}
	}
	return out
}

// exhaustive tries every four graduations of all barrels, in fractions, with
// no thought of speed. It reads the target as a share of the strength.
func exhaustive(w Wanted, orders ...[]int) (best []made, found bool) {
	best = make([]made, len(orders))
	share := new(big.Rat).Quo(w.Concentration.Rat(), w.Strength.Rat())
	within := new(big.Rat).Quo(w.Tolerance.Rat(), big.NewRat(100, 1))
	all := linesOf(w.Barrels, w.Smallest)
	for _, d := range all {
		for _, m := range all {
			first := new(big.Rat).Quo(d.volume, m.volume)
			if first.Cmp(big.NewRat(1, 1)) >= 0 || outside(first, w) {
				continue
			}
			for _, k := range all {
				if k.volume.Cmp(m.volume) >= 0 || k.volume.Cmp(w.Volume.Rat()) >= 0 {
					continue
				}
				x := new(big.Rat).Mul(first, k.volume)
				x.Quo(x, w.Volume.Rat()).Quo(x, share).Sub(x, big.NewRat(1, 1)).Abs(x)
				if x.Cmp(within) > 0 {
					continue
				}
				c, given := weigh(w, x, d, m, k)
				for i, order := range orders {
					if given && (!found || c.before(best[i], order)) {
						best[i] = c
					}
				}
				found = found || given
			}
		}
	}
	return best, found
}

func outside(first *big.Rat, w Wanted) bool {
	c := w.Strength.Scaled(first)
	return w.Low.Given() && c.Rat().Cmp(w.Low.Rat()) < 0 || w.High.Given() && c.Rat().Cmp(w.High.Rat()) > 0
}

// weigh finds the best giving syringe for one preparation too.
func weigh(w Wanted, off *big.Rat, d, m, k line) (best made, given bool) {
	left := new(big.Rat).Sub(big.NewRat(1, 1), new(big.Rat).Quo(k.volume, m.volume))
	left.Mul(left, d.volume)
	for _, g := range linesOf(w.Barrels, w.Smallest) {
		if g.volume.Cmp(w.Volume.Rat()) != 0 {
			continue
		}
		spread := new(big.Rat).Mul(d.ratio, m.ratio)
		spread.Mul(spread, k.ratio).Mul(spread, g.ratio)
		capacity := new(big.Rat).Add(d.nominal, m.nominal)
		capacity.Add(capacity, k.nominal).Add(capacity, g.nominal)
		c := made{off, spread, left, capacity, m.volume, d.volume, k.volume}
		if !given || c.before(best, byRule) {
			best, given = c, true
		}
	}
	return best, given
}

// drawWanted draws a target for two or three small barrels of few lines.
func drawWanted(t *rapid.T) Wanted {
	sizes := [][2]string{{"1", "0.1"}, {"1", "0.2"}, {"2", "0.2"}, {"2", "0.5"}, {"3", "0.5"}, {"5", "0.5"}, {"5", "1"}, {"10", "1"}, {"10", "2"}, {"20", "2"}, {"50", "5"}}
	var barrels []syringe.Barrel
	for _, i := range rapid.SliceOfNDistinct(rapid.IntRange(0, len(sizes)-1), 2, 3, rapid.ID[int]).Draw(t, "barrels") {
		barrels = append(barrels, barrelOf(t, sizes[i][0], sizes[i][1]))
	}
	giving := rapid.SampledFrom(barrels).Draw(t, "giving")
	lines := int(new(big.Rat).Quo(giving.Nominal().Rat(), giving.Step().Rat()).Num().Int64())
	w := Wanted{Strength: conc(t, "10 mg/mL"), Barrels: barrels, Tolerance: per(t, rapid.SampledFrom([]string{"0", "2", "5", "10"}).Draw(t, "tolerance")),
		Volume: giving.Step().Times(rapid.IntRange(1, lines).Draw(t, "final")), Smallest: mL(t, rapid.SampledFrom([]string{"0.1", "0.5"}).Draw(t, "smallest"))}
	share := big.NewRat(rapid.Int64Range(1, 40).Draw(t, "part"), rapid.Int64Range(41, 900).Draw(t, "of"))
	w.Concentration = w.Strength.Scaled(share)
	if rapid.Bool().Draw(t, "bounded") {
		w.Low = w.Strength.Scaled(big.NewRat(rapid.Int64Range(1, 30).Draw(t, "low"), 100))
		w.High = w.Strength.Scaled(big.NewRat(rapid.Int64Range(30, 100).Draw(t, "high"), 100))
	}
	return w
}

// TestNeverWorse holds the search to an exhaustive one: not merely as near to the
// target, but the same by every figure of the order; and so the rivals that are
// the narrowest and the most thrifty.
func TestNeverWorse(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) { hold(t, drawWanted(t)) })
}

// TestLeastTaken is a case that chance rarely hits: the least volume that can be
// taken is already too much, and the narrowest is reached by drawing more still.
func TestLeastTaken(t *testing.T) {
	w := wanted(t, "10 mg/mL", "0.22 mg/mL", "10")
	w.Barrels, w.Smallest, w.Tolerance = []syringe.Barrel{barrelOf(t, "20", "1"), barrelOf(t, "1", "0.5")}, mL(t, "0.5"), per(t, "20")
	hold(t, w)
}

// hold holds one search to an exhaustive one.
func hold(t failing, w Wanted) {
	t.Helper()
	want, found := exhaustive(w, byRule, byInterval, byWaste)
	f, err := Find(w)
	var none *NoneError
	var unreadable *UnreadableError
	switch {
	case !found && (errors.As(err, &none) || errors.As(err, &unreadable)) || belowSmallest(err) && w.Volume.Cmp(w.Smallest) < 0:
		return
	case err != nil || !found:
		t.Fatalf("got %v, exhaustive search found %v", err, found)
	}
	got := judged(f.Plan)
	if !got.same(want[0]) {
		t.Fatalf("got %s, exhaustive search %s", got, want[0])
	}
	narrowest, thrifty := got, got // where no rival is
	for _, r := range f.Rivals {
		j := judged(r.Plan)
		if !got.before(j, byRule) || r.Lost == 0 {
			t.Fatalf("rival %s is no worse than %s, or lost by nothing", j, got)
		}
		if off := new(big.Rat).Abs(r.Error.Rat()); off.Cmp(w.Tolerance.Rat()) > 0 {
			t.Fatalf("rival is %s off", off)
		}
		if r.Narrowest {
			narrowest = j
		}
		if r.LeastWaste {
			thrifty = j
		}
	}
	if !narrowest.same(want[1]) || !thrifty.same(want[2]) {
		t.Fatalf("narrowest %s, least waste %s, exhaustive search %s and %s", narrowest, thrifty, want[1], want[2])
	}
}

func belowSmallest(err error) bool {
	var below *syringe.BelowSmallest
	return errors.As(err, &below)
}

// judged is a plan as the exhaustive search judges it. Drug left is as volume of
// 10 mg/mL.
func judged(p Plan) made {
	off := new(big.Rat).Abs(p.Error.Rat())
	left := new(big.Rat).Quo(p.LeftAmount.Rat(), big.NewRat(10, 1))
	capacity := new(big.Rat)
	for _, r := range []syringe.Reading{p.Draw, p.Intermediate.Reading, p.Take, p.Final.Reading} {
		capacity.Add(capacity, r.Barrel.Nominal().Rat())
	}
	return made{off.Quo(off, big.NewRat(100, 1)), p.Spread, left, capacity, p.Intermediate.Reading.Volume.Rat(), p.Draw.Volume.Rat(), p.Take.Volume.Rat()}
}

// String lists the figures for a message.
func (m made) String() string {
	s := ""
	for _, x := range m {
		s += x.FloatString(4) + " "
	}
	return s
}
