package main

import (
	"errors"
	"fmt"
	"math/big"

	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/dilution/syringe"
)

// Settings of the quick sums, which know no site.
const (
	smallestTenths = 1 // 0.1 mL, rule R8
	withinPercent  = 5 // common practice, no source
)

// notMeasured marks a volume that the cautions below speak of.
const notMeasured = "no single stocked syringe measures it"

// A readingJSON is how a stocked barrel measures a volume.
type readingJSON struct {
	Barrel *quantityJSON `json:"barrel"`
	Volume *quantityJSON `json:"volume"`
	Moved  *quantityJSON `json:"moved"` // reading minus volume, in per cent of it
}

func readingOf(s quantity.Style, x syringe.Reading) *readingJSON {
	return &readingJSON{
		Barrel: volumeJSON(s, x.Barrel.Nominal()), Volume: volumeJSON(s, x.Volume),
		Moved: &quantityJSON{exactText(x.MovedPercent), signed(s, x.MovedPercent) + " %", "%"},
	}
}

func (x *readingJSON) words() string {
	return fmt.Sprintf("%s on a %s syringe (%s)", x.Volume.Printed, x.Barrel.Printed, x.Moved.Printed)
}

// measure reads v on the smallest stocked barrel that holds it. What cannot be
// measured is false: a caution, or a refusal where strict, as in an order.
func (r *request) measure(field string, v quantity.Volume, strict bool) (syringe.Reading, bool) {
	smallest := quantity.Millilitres(big.NewRat(smallestTenths, 10))
	within := quantity.PerCent(big.NewRat(withinPercent, 1))
	got, err := syringe.Measure(v, syringe.Stocked(), smallest, within)
	if err != nil {
		if fault := measureFault(r.style, field, v, err); strict {
			r.add(fault)
		} else {
			r.caution(fault)
		}
		return syringe.Reading{}, false
	}
	if got.MovedPercent.Sign() != 0 {
		r.caution(refusal.Reason{
			Code: refusal.VolumeOffGraduation, Field: field, Rule: "R2", Source: got.Barrel.Source(),
			Got: r.style.Volume(v), Want: "a multiple of " + r.style.Volume(got.Barrel.Step()),
			Message: fmt.Sprintf("%s: %s has no line on the %s syringe; the nearest is %s, %s %%", field, r.style.Volume(v),
				r.style.Volume(got.Barrel.Nominal()), r.style.Volume(got.Volume), signed(r.style, got.MovedPercent)),
			Remedy: "choose figures that fall on a line, or accept the difference",
		})
	}
	if got.UnderFifth {
		r.caution(refusal.Reason{
			Code: refusal.VolumeUnderFifth, Field: field, Rule: "R8", Source: syringe.ToleranceSource,
			Got: r.style.Volume(got.Volume), Want: "at least 20 % of the barrel",
			Message: fmt.Sprintf("%s: %s is under a fifth of the %s syringe; the reading may be off by %s", field, r.style.Volume(got.Volume),
				r.style.Volume(got.Barrel.Nominal()), r.style.Volume(got.Tolerance)),
			Remedy: "use a weaker presentation or a larger volume",
		})
	}
	return got, true
}

// measureFault says as a caution why no stocked barrel measures v.
func measureFault(s quantity.Style, field string, v quantity.Volume, err error) refusal.Reason {
	x := refusal.Reason{Field: field, Got: s.Volume(v), Rule: "R8"}
	var below *syringe.BelowSmallest
	var none *syringe.NoBarrel
	var off *syringe.OffGraduation
	switch {
	case errors.As(err, &below):
		x.Code, x.Want = refusal.VolumeBelowMeasurable, "at least "+s.Volume(below.Smallest)
		x.Message = fmt.Sprintf("%s: %s is below the smallest volume that is measured, %s", field, s.Volume(v), s.Volume(below.Smallest))
		x.Remedy = "use a weaker presentation, a larger volume, or one intermediate dilution with its own label"
	case errors.As(err, &none):
		x.Code, x.Want = refusal.VolumeAboveSyringe, "at most "+s.Volume(none.Largest)
		x.Message = fmt.Sprintf("%s: %s is more than the largest stocked syringe holds, %s", field, s.Volume(v), s.Volume(none.Largest))
		x.Remedy = "measure it in parts, and check each part"
	case errors.As(err, &off):
		x.Code, x.Want = refusal.VolumeOffGraduation, "a multiple of "+s.Volume(off.Barrel.Step())
		x.Message = fmt.Sprintf("%s: %s has no line on the %s syringe; the nearest, %s, is %s %% off", field, s.Volume(v),
			s.Volume(off.Barrel.Nominal()), s.Volume(off.Moved), signed(s, off.Percent))
		x.Remedy = "use a weaker presentation or a larger volume"
	default:
		x.Code, x.Message = refusal.VolumeOffGraduation, field+": "+err.Error()
	}
	return x
}

// halfWidth is how far a reading can be from the volume wanted, in per cent:
// the barrel's tolerance, and the move to its line.
func halfWidth(x syringe.Reading) *big.Rat {
	sum := new(big.Rat).Abs(x.MovedPercent)
	return sum.Add(sum, x.Relative().Rat())
}

// An intervalJSON is where the true concentration lies (rule R9), as far as
// measuring goes.
type intervalJSON struct {
	Low     *quantityJSON `json:"low"`
	High    *quantityJSON `json:"high"`
	Percent *quantityJSON `json:"percent"`    // either way, GUM with coverage factor 2
	Worst   *quantityJSON `json:"worst_case"` // either way, everything off to one side
	Covers  string        `json:"covers"`
}

// intervalOf combines half widths in per cent around c. The assay's is not given
// where nobody said it.
func intervalOf(s quantity.Style, c quantity.Concentration, parts []*big.Rat, assay quantity.Percent) (*intervalJSON, error) {
	var widths []quantity.Percent
	covers, worst := "not the assay of the presentation", new(big.Rat)
	if assay.Given() {
		parts = append([]*big.Rat{assay.Rat()}, parts...)
		covers = "the assay of the presentation, " + s.Percent(assay)
	}
	for _, p := range parts {
		widths = append(widths, quantity.PerCent(p))
		worst.Add(worst, p)
	}
	percent, err := syringe.Interval(widths...)
	if err != nil {
		return nil, err
	}
	share := new(big.Rat).Quo(percent.Rat(), big.NewRat(100, 1))
	one := big.NewRat(1, 1)
	low := c.Scaled(new(big.Rat).Sub(one, share))
	high := c.Scaled(new(big.Rat).Add(one, share))
	bound := func(x quantity.Concentration) *quantityJSON {
		u := c.Best() // one unit for both ends
		return &quantityJSON{x.Exact(u), s.ConcentrationIn(x, u), u.String() + "/mL"}
	}
	return &intervalJSON{
		Low: bound(low), High: bound(high), Percent: percentJSON(s, percent), Worst: percentJSON(s, quantity.PerCent(worst)),
		Covers: "measuring syringes (" + syringe.ToleranceSource + "); " + covers,
	}, nil
}
