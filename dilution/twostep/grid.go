package twostep

import (
	"cmp"
	"math/big"
	"slices"

	"drawup/dilution/quantity"
	"drawup/dilution/syringe"
)

// Sizes of a search, our own choice. A grid of mostUnits keeps the product of
// three volumes within 63 bits, so that whole numbers stay exact.
const (
	mostUnits = 2_000_000
	mostLines = 20_000
)

// A volume is one that a stocked barrel shows, in whole units of the grid, with
// the barrel that reads it most surely.
type volume struct {
	n         int64
	nominal   int64 // of the barrel
	barrel    syringe.Barrel
	tolerance quantity.Volume

	// ratio is (v + tolerance) / (v - tolerance): what this reading multiplies
	// the spread by, whether the concentration rises or falls with it. rank orders
	// the ratios, equal ones alike; floor is the whole part of 65,536 times ratio.
	ratio *big.Rat
	rank  int
	floor uint64
}

// A grid is every volume that can be read, smallest first, and what a unit is.
type grid struct {
	perML   *big.Int
	volumes []volume
}

// gridOf lists what the barrels show from smallest on. Extra volumes must be
// whole on the grid too.
func gridOf(barrels []syringe.Barrel, smallest, extra quantity.Volume) (grid, error) {
	g := grid{perML: new(big.Int).Set(extra.Rat().Denom())}
	lines, largest := int64(0), new(big.Rat).Set(extra.Rat())
	for _, b := range barrels {
		if !b.Given() {
			continue
		}
		g.perML = common(g.perML, b.Step().Rat().Denom())
		n := new(big.Rat).Quo(b.Nominal().Rat(), b.Step().Rat()).Num()
		if !n.IsInt64() || n.Int64() > mostLines {
			return grid{}, &TooFineError{Lines: mostLines + 1}
		}
		lines += n.Int64()
		if b.Nominal().Rat().Cmp(largest) > 0 {
			largest = b.Nominal().Rat()
		}
	}
	if lines > mostLines {
		return grid{}, &TooFineError{Lines: lines}
	}
	if new(big.Rat).Mul(largest, new(big.Rat).SetInt(g.perML)).Cmp(big.NewRat(mostUnits, 1)) > 0 {
		return grid{}, &TooFineError{}
	}
	best := map[int64]volume{}
	for _, b := range barrels {
		if b.Given() {
			g.lines(b, smallest, best)
		}
	}
	for _, v := range best {
		if v.ratio = g.surely(v); v.ratio != nil {
			g.volumes = append(g.volumes, v)
		}
	}
	slices.SortFunc(g.volumes, func(a, b volume) int { return int(a.n - b.n) })
	g.ranked()
	return g, nil
}

// common is the smallest multiple of both.
func common(a, b *big.Int) *big.Int {
	d := new(big.Int).GCD(nil, nil, a, b)
	return d.Mul(new(big.Int).Quo(a, d), b)
}

// units is v on the grid.
func (g grid) units(v quantity.Volume) int64 {
	return new(big.Rat).Mul(v.Rat(), new(big.Rat).SetInt(g.perML)).Num().Int64()
}

// volume is n units.
func (g grid) volume(n int64) quantity.Volume {
	return quantity.Millilitres(new(big.Rat).SetFrac(big.NewInt(n), g.perML))
}

// lines puts every volume that b shows into best, unless another barrel reads
// it as surely and is no larger.
func (g grid) lines(b syringe.Barrel, smallest quantity.Volume, best map[int64]volume) {
	step, nominal := g.units(b.Step()), g.units(b.Nominal())
	from, _, err := smallest.ToStep(b.Step(), quantity.Up)
	if err != nil || from.Cmp(b.Nominal()) > 0 {
		return // nothing that this barrel shows is large enough
	}
	for n := max(step, g.units(from)); n <= nominal; n += step {
		read := volume{n: n, nominal: nominal, barrel: b, tolerance: b.Tolerance(g.volume(n))}
		if old, seen := best[n]; !seen || read.surer(old) {
			best[n] = read
		}
	}
}

// surer is [surer] for readings of one volume.
func (v volume) surer(o volume) bool {
	n := cmp.Or(v.tolerance.Cmp(o.tolerance), cmp.Compare(v.nominal, o.nominal))
	return n < 0 || n == 0 && v.barrel.Step().Cmp(o.barrel.Step()) < 0
}

// surely is the reading's ratio; nil if it measures nothing.
func (g grid) surely(v volume) *big.Rat {
	t := v.tolerance.Rat()
	all := new(big.Int).Mul(big.NewInt(v.n), t.Denom())
	off := new(big.Int).Mul(g.perML, t.Num())
	if new(big.Rat).SetFrac(off, all).Cmp(widest()) > 0 {
		return nil
	}
	return new(big.Rat).SetFrac(new(big.Int).Add(all, off), new(big.Int).Sub(all, off))
}

// ranked gives every volume its rank and floor. With a tolerance of at most nine
// tenths a ratio is at most 19, so floor stays under 21 bits and the product of
// three under 63.
func (g grid) ranked() {
	order := make([]*volume, len(g.volumes))
	for i := range g.volumes {
		v := &g.volumes[i]
		scaled := new(big.Int).Lsh(v.ratio.Num(), 16)
		v.floor = scaled.Quo(scaled, v.ratio.Denom()).Uint64()
		order[i] = v
	}
	slices.SortFunc(order, func(a, b *volume) int {
		if n := cmp.Compare(a.floor, b.floor); n != 0 {
			return n
		}
		return a.ratio.Cmp(b.ratio)
	})
	for i, v := range order {
		v.rank = i
		if i > 0 && v.ratio.Cmp(order[i-1].ratio) == 0 {
			v.rank = order[i-1].rank
		}
	}
}
