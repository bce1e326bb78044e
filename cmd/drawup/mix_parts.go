package main

import (
	"fmt"
	"math/big"

	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/dilution/syringe"
)

// mixParts is how far each measured volume can be off, as a share of the
// concentration in per cent. It is false when a volume cannot be measured, or
// nothing is known of it. With --drug what cannot be measured is refused, as in
// an order; the fluid for a powder is not looked at there either.
func mixParts(r *request, m mixture, doc *mixDocument) ([]*big.Rat, bool) {
	one := big.NewRat(1, 1)
	p := &widths{r: r, all: true, strict: r.given("drug") && !r.refused() && m.method != methodPowder}
	if m.drug.Given() && !m.drug.IsZero() {
		weight := one
		if m.method == methodAdd { // the share of the other volume weighs each reading (GUM)
			weight = share(m.diluent, m.volume)
		}
		if got, ok := p.add("drug volume", m.drug, weight); ok {
			doc.DrugReading = readingOf(r.style, got)
		}
	}
	switch m.method {
	case methodMakeUp:
		if got, ok := p.add("final volume", m.volume, one); ok && p.strict && got.MovedPercent.Sign() != 0 {
			r.add(finalOffGraduation(r.style, m.volume, got))
		}
	case methodAdd, methodPowder:
		if m.diluent.Given() && !m.diluent.IsZero() {
			p.add("diluent volume", m.diluent, share(m.diluent, m.volume))
		}
	case methodNeat: // the reading changes the amount, not the concentration
		p.parts = nil
	case methodFinal: // what is drawn is not known
		return nil, false
	case methodAddTo, methodReplace: // the bag's own error is a caution
	}
	return p.parts, p.all
}

// widths gathers the half widths of readings in per cent.
type widths struct {
	r      *request
	parts  []*big.Rat
	all    bool // every volume could be measured
	strict bool // what cannot be measured is refused
}

// add reads v on a barrel and keeps its half width times weight.
func (p *widths) add(field string, v quantity.Volume, weight *big.Rat) (syringe.Reading, bool) {
	got, ok := p.r.measure(field, v, p.strict)
	if !ok {
		p.all = false
		return got, false
	}
	p.parts = append(p.parts, new(big.Rat).Mul(halfWidth(got), weight))
	return got, true
}

// share is v as a part of whole.
func share(v, whole quantity.Volume) *big.Rat { return new(big.Rat).Quo(v.Rat(), whole.Rat()) }

// finalOffGraduation refuses a final volume that its barrel does not show, as an
// order does.
func finalOffGraduation(s quantity.Style, v quantity.Volume, got syringe.Reading) refusal.Reason {
	return refusal.Reason{
		Code: refusal.VolumeOffGraduation, Severity: refusal.Refuse, Field: "final volume", Rule: "R8",
		Got: s.Volume(v), Want: "a multiple of " + s.Volume(got.Barrel.Step()),
		Message: fmt.Sprintf("the %s syringe has no line at the final volume, %s", s.Volume(got.Barrel.Nominal()), s.Volume(v)),
		Remedy:  "make up to " + s.Volume(got.Volume),
	}
}
