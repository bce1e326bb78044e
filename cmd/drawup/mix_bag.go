package main

import (
	"fmt"
	"io"
	"math/big"

	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// A bagJSON is what a bag that was measured adds to the answer: the figure by its
// label beside the one by what it holds.
type bagJSON struct {
	Labelled   *quantityJSON `json:"bag_labelled,omitempty"`
	Measured   *quantityJSON `json:"bag_measured,omitempty"`
	ByLabel    *quantityJSON `json:"concentration_by_label,omitempty"`
	Difference *quantityJSON `json:"difference,omitempty"` // concentration minus that by label, in per cent of it
}

// readBag is what the bag holds: as measured, or as labelled.
func (m *mixture) readBag(r *request, labelled quantity.Volume) quantity.Volume {
	m.measured = read(r, "bag-holds", quantity.ParseVolume)
	if !m.measured.Given() {
		return labelled
	}
	share := new(big.Rat).Quo(m.measured.Rat(), labelled.Rat())
	if share.Cmp(big.NewRat(1, 2)) < 0 || share.Cmp(big.NewRat(2, 1)) > 0 {
		r.add(refusal.Reason{
			Code: refusal.ContradictoryAmounts, Field: "--bag-holds", Rule: "R5", Source: netSource,
			Got: r.style.Volume(m.measured), Want: "half to twice of " + r.style.Volume(labelled),
			Message: fmt.Sprintf("a bag of %s cannot hold %s", r.style.Volume(labelled), r.style.Volume(m.measured)),
			Remedy:  "check both volumes, and that they are not swapped",
		})
	}
	return m.measured
}

// tellBag compares a measured bag with its label.
func (m mixture) tellBag(r *request, d *mixDocument) {
	if !m.measured.Given() || r.refused() {
		return
	}
	nominal := m.bag
	if m.method == methodAddTo {
		nominal = m.bag.Plus(m.drug)
	}
	by, err := m.amount.In(nominal)
	if err != nil {
		r.add(faultOf("--bag-holds", err))
		return
	}
	off := new(big.Rat).Quo(m.conc.Rat(), by.Rat())
	off.Sub(off, big.NewRat(1, 1)).Mul(off, big.NewRat(100, 1))
	d.bagJSON = bagJSON{
		volumeJSON(r.style, m.bag), volumeJSON(r.style, m.measured), concentrationJSON(r.style, by),
		&quantityJSON{exactText(off), signed(r.style, off) + " %", "%"},
	}
}

// tell writes both figures of a measured bag.
func (b *bagJSON) tell(w io.Writer) {
	if b.Measured == nil {
		return
	}
	line(w, "bag", fmt.Sprintf("labelled %s, measured %s", b.Labelled.Printed, b.Measured.Printed))
	line(w, "by the label", fmt.Sprintf("%s; the mixture differs by %s", shown(b.ByLabel), b.Difference.Printed))
}
