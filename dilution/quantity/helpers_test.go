package quantity

import (
	"math/big"

	"pgregory.net/rapid"
)

func mulRat(a, b *big.Rat) *big.Rat { return new(big.Rat).Mul(a, b) }
func quoRat(a, b *big.Rat) *big.Rat { return new(big.Rat).Quo(a, b) }
func addRat(a, b *big.Rat) *big.Rat { return new(big.Rat).Add(a, b) }

// aRat draws a fraction above zero: many short decimals, some that never end,
// over many sizes, and often just beside a power of ten, where rounding carries.
func aRat() *rapid.Generator[*big.Rat] {
	return rapid.Custom(func(t *rapid.T) *big.Rat {
		n := rapid.Int64Range(1, 999_999_999).Draw(t, "numerator")
		den := rapid.SampledFrom([]int64{1, 1, 10, 100, 1000, 100000, 3, 7, 8, 60, 999}).Draw(t, "denominator")
		if rapid.Bool().Draw(t, "near a power of ten") {
			n = rapid.SampledFrom([]int64{1, 10, 100, 1000, 10000, 100000, 1000000}).Draw(t, "power")*1000 + rapid.Int64Range(-999, 999).Draw(t, "off")
			if n <= 0 {
				n = 1
			}
		}
		return big.NewRat(n, den)
	})
}

func allUnits() []Unit {
	return []Unit{Gram(), Milligram(), Microgram(), Nanogram(), Units(), Milliunits(), Millimole(), Micromole()}
}

func aUnit() *rapid.Generator[Unit] { return rapid.SampledFrom(allUnits()) }

func styles() []Style { return []Style{UK(), US(), SI()} }

func anAmount() *rapid.Generator[Amount] {
	return rapid.Custom(func(t *rapid.T) Amount {
		return AmountOf(aRat().Draw(t, "n"), aUnit().Draw(t, "unit"))
	})
}

// doseOf and doseRateOf build what Parse would read, for any fraction.
func doseOf(n *big.Rat, u Unit, b Basis) Dose {
	return Dose{x: fromRat(n).mul(u.scale), kind: u.kind, basis: b, unit: u}
}

func doseRateOf(n *big.Rat, u Unit, b Basis, p Period) DoseRate {
	return DoseRate{x: fromRat(n).mul(u.scale).mul(p.perHour()), kind: u.kind, basis: b, unit: u, period: p}
}
