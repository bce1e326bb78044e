package syringe

import (
	"math/big"

	"drawup/dilution/quantity"
)

// Where graduations are written down. The standard gives only the coarsest
// interval allowed; syringes in use are finer.
const (
	readingGuide = "how to read a syringe, quoting a technical university, no date"
	samplingUnit = "is syringe sampling performance related to its volume?, hospital unit's abstract, no date"
	noSource     = "common practice, no source seen"
)

// size is one row of the table of known barrels.
type size struct {
	nominal int64 // mL
	a, b    int64 // graduation a/b mL
	source  string
	stocked bool
}

// sizes is the table of known barrels, smallest first.
func sizes() []size {
	return []size{
		{1, 1, 100, readingGuide, true},
		{2, 1, 10, noSource, true}, // the 3 mL barrel's 0.1 mL is sourced, the 2 mL barrel's is not
		{3, 1, 10, readingGuide, false},
		{5, 1, 5, readingGuide, true},
		{10, 1, 5, readingGuide, true},
		{20, 1, 1, noSource, true},
		{30, 1, 1, samplingUnit, false},
		{50, 1, 1, samplingUnit, true},
	}
}

// Known lists every barrel whose graduation is on record, smallest first. No
// larger one is more finely graduated than a smaller one.
func Known() []Barrel { return barrels(func(size) bool { return true }) }

// Stocked lists the barrels that a site is taken to hold unless it says
// otherwise: 1, 2, 5, 10, 20 and 50 mL, smallest first.
func Stocked() []Barrel { return barrels(func(s size) bool { return s.stocked }) }

// Find is the known barrel of a nominal capacity.
func Find(nominal quantity.Volume) (Barrel, bool) {
	if !nominal.Given() {
		return Barrel{}, false
	}
	for _, b := range Known() {
		if b.nominal.Cmp(nominal) == 0 {
			return b, true
		}
	}
	return Barrel{}, false
}

func barrels(wanted func(size) bool) []Barrel {
	var list []Barrel
	for _, s := range sizes() {
		if wanted(s) {
			list = append(list, Barrel{millilitres(s.nominal, 1), millilitres(s.a, s.b), s.source})
		}
	}
	return list
}

func millilitres(a, b int64) quantity.Volume { return quantity.Millilitres(big.NewRat(a, b)) }
