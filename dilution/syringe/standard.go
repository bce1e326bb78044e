package syringe

import (
	"fmt"
	"math/big"

	"drawup/dilution/quantity"
)

// StandardSource names the table behind [Barrel.Standard]. Its edition of 1993
// is withdrawn; that the columns used here stand unchanged in that of 2017 is
// believed, not seen.
const StandardSource = "ISO 7886-1:1993, table 1 (scale interval, dead space)"

// Bounds of our own, where the standard has none.
const (
	// mostLines is how many lines a scale may have. The standard's shortest scale
	// for 1 mL is 57 mm; 200 lines on it lie a quarter of a millimetre apart.
	mostLines = 200
	// mostNominal is the largest syringe in mL.
	mostNominal = 200
)

// A class is one row of ISO 7886-1, table 1: what holds for barrels below a
// nominal capacity. Volumes are in thousandths of a mL.
type class struct {
	below         int64 // mL; 0 for no end
	interval, gap int64
}

// classes is the table, smallest barrels first: the widest scale interval and
// the largest dead space.
func classes() []class {
	return []class{{2, 50, 70}, {5, 200, 70}, {10, 500, 75}, {20, 1000, 100}, {30, 2000, 150}, {50, 2000, 170}, {0, 5000, 200}}
}

// A StandardError says what of a barrel the standard, or a bound of ours, does
// not allow.
type StandardError struct {
	What      string // "graduation", "dead space", "capacity"
	Got, Most quantity.Volume
	Own       bool // the bound is ours
	Why       string
}

// Error says what was got and what is wanted.
func (e *StandardError) Error() string {
	return fmt.Sprintf("got a %s of %s mL: %s", e.What, text(e.Got), e.Why)
}

// Standard holds a barrel that a site describes against ISO 7886-1, table 1: its
// graduation may be no coarser than the widest scale interval of its size, and
// its dead space, where one is given, no larger than the largest. Bounds of our
// own: at most 200 lines, at most 200 mL. Errors: *StandardError;
// *quantity.NotGivenError for no barrel.
func (b Barrel) Standard(dead quantity.Volume) error {
	if !b.Given() {
		return &quantity.NotGivenError{What: "a barrel"}
	}
	if most := millilitres(mostNominal, 1); b.nominal.Cmp(most) > 0 {
		return &StandardError{What: "capacity", Got: b.nominal, Most: most, Own: true, Why: "no syringe is that large"}
	}
	row := b.class()
	if most := millilitres(row.interval, 1000); b.step.Cmp(most) > 0 {
		return &StandardError{What: "graduation", Got: b.step, Most: most,
			Why: fmt.Sprintf("coarser than %s mL, the widest that the standard allows for this size", text(most))}
	}
	if lines := new(big.Rat).Quo(b.nominal.Rat(), b.step.Rat()); lines.Cmp(big.NewRat(mostLines, 1)) > 0 {
		return &StandardError{What: "graduation", Got: b.step, Most: millilitres(0, 1), Own: true,
			Why: fmt.Sprintf("that is more than %d lines, which nobody can read", mostLines)}
	}
	if most := millilitres(row.gap, 1000); dead.Given() && dead.Cmp(most) > 0 {
		return &StandardError{What: "dead space", Got: dead, Most: most,
			Why: fmt.Sprintf("more than %s mL, the most that the standard allows for this size", text(most))}
	}
	return nil
}

// class is the row of the table for the barrel.
func (b Barrel) class() class {
	all := classes()
	for _, c := range all[:len(all)-1] {
		if b.nominal.Rat().Cmp(big.NewRat(c.below, 1)) < 0 {
			return c
		}
	}
	return all[len(all)-1]
}
