package syringe

import (
	"fmt"
	"math/big"

	"drawup/dilution/quantity"
)

// A Barrel is one size of syringe: its nominal capacity and its graduation.
// Its zero value is no barrel and measures nothing.
type Barrel struct {
	nominal, step quantity.Volume
	source        string
}

// A BarrelError says why a capacity and a graduation make no barrel.
type BarrelError struct {
	Nominal, Step quantity.Volume
	Why           string
}

// Error says what was got and what is wanted.
func (e *BarrelError) Error() string {
	return fmt.Sprintf("got a barrel of %s mL in steps of %s mL: %s", text(e.Nominal), text(e.Step), e.Why)
}

// New makes a barrel of the nominal capacity, graduated in steps. Both must be
// above zero and the capacity must be a multiple of the step, so that a full
// barrel can be read. Source says where the graduation is written down.
func New(nominal, step quantity.Volume, source string) (Barrel, error) {
	switch {
	case !positive(nominal):
		return Barrel{}, &BarrelError{nominal, step, "the capacity is not above zero"}
	case !positive(step):
		return Barrel{}, &BarrelError{nominal, step, "the graduation is not above zero"}
	case !new(big.Rat).Quo(nominal.Rat(), step.Rat()).IsInt():
		return Barrel{}, &BarrelError{nominal, step, "the capacity is not a multiple of the graduation"}
	}
	return Barrel{nominal, step, source}, nil
}

// Nominal is the nominal capacity.
func (b Barrel) Nominal() quantity.Volume { return b.nominal }

// Step is the graduation: the volume between two neighbouring lines.
func (b Barrel) Step() quantity.Volume { return b.step }

// Source says where the graduation is written down, or that it is common
// practice without a source.
func (b Barrel) Source() string { return b.source }

// Given reports whether this is a barrel at all.
func (b Barrel) Given() bool { return positive(b.nominal) && positive(b.step) }

// ToleranceSource names the standard behind [Barrel.Tolerance].
const ToleranceSource = "ISO 7886-1:1993, table 1 (graduated capacity)"

// Tolerance is how far the expelled volume may be from v when v is read on the
// barrel, in mL either way, after ISO 7886-1, table 1. With V the nominal
// capacity: below V/2 it is 1.5 % of V and 2 % of v (V under 5 mL) or 1 % of v
// (V from 5 mL on); from V/2 on 5 % of v (V under 5 mL) or 4 % of v. The result
// is not given when the barrel is none or v is not given or above V.
func (b Barrel) Tolerance(v quantity.Volume) quantity.Volume {
	if !b.Given() || !v.Given() || v.Cmp(b.nominal) > 0 {
		return quantity.Volume{}
	}
	whole, x := b.nominal.Rat(), v.Rat()
	small := whole.Cmp(big.NewRat(5, 1)) < 0
	if new(big.Rat).Mul(x, big.NewRat(2, 1)).Cmp(whole) >= 0 {
		if small {
			return share(x, 5, 100)
		}
		return share(x, 4, 100)
	}
	ofRead := share(x, 1, 100)
	if small {
		ofRead = share(x, 2, 100)
	}
	return share(whole, 15, 1000).Plus(ofRead)
}

func share(x *big.Rat, a, b int64) quantity.Volume {
	return quantity.Millilitres(new(big.Rat).Mul(x, big.NewRat(a, b)))
}

func positive(v quantity.Volume) bool { return v.Given() && v.Rat().Sign() > 0 }

// text is v in mL for errors.
func text(v quantity.Volume) string {
	if !v.Given() {
		return "no"
	}
	return v.Exact()
}
