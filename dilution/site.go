package dilution

import (
	"fmt"
	"math/big"
	"slices"
	"time"

	"drawup/dilution/formulary"
	"drawup/dilution/order"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/dilution/syringe"
)

// A site is what an order file may set once for all its syringes, with the
// values that hold when it is silent.
type site struct {
	style     quantity.Style
	smallest  quantity.Volume
	tolerance quantity.Percent
	step      quantity.FlowRate
	barrels   []syringe.Barrel
	bolus     useByPolicy
	infusion  useByPolicy

	stock   *stock // nil without a shelf
	explain bool   // keep the alternatives that were weighed

	jurisdiction string            // whose standard preparations are used; "" for any
	tallMan      formulary.TallMan // the zero list has no names
	dualNames    bool

	edition, region string // scheme of label classes, "" for the usual one
}

type useByPolicy struct {
	minutes int64
	source  string
}

// Values for a silent site. The times are remembered figures and say so.
const (
	defaultSmallest  = "0.1 mL" // rule R8
	defaultTolerance = "5 %"    // common practice, no source
	defaultStep      = "0.1 mL/h"
	defaultBolus     = 4 * 60
	defaultInfusion  = 24 * 60
	defaultSource    = "default of this tool, unverified: 4 h for immediate use after US Pharmacopeia, chapter 797 (2023), " +
		"24 h for infusions; set the site's own"
)

// widestTolerance is the most that a site may let a graduation move a volume,
// in per cent: our choice, the assay limits' own width.
const widestTolerance = 10

// siteOf reads the site's settings. A value that could not be read was refused
// then; the default stands in for it, so that the other faults show too.
func siteOf(o order.Order) (site, error) {
	s := site{style: quantity.UK(), barrels: syringe.Stocked(),
		bolus: useByPolicy{defaultBolus, defaultSource}, infusion: useByPolicy{defaultInfusion, defaultSource}}
	var err error
	if s.smallest, err = quantity.ParseVolume(defaultSmallest); err != nil {
		return s, err
	}
	if s.tolerance, err = quantity.ParsePercent(defaultTolerance); err != nil {
		return s, err
	}
	if s.step, err = quantity.ParseFlowRate(defaultStep); err != nil {
		return s, err
	}
	in := o.Site
	if in.Style.Value.String() != "" {
		s.style = in.Style.Value
	}
	if in.Smallest.Value.Given() {
		s.smallest = in.Smallest.Value
	}
	if in.Tolerance.Value.Given() {
		s.tolerance = in.Tolerance.Value
	}
	if s.tolerance.Rat().Cmp(big.NewRat(widestTolerance, 1)) > 0 {
		return s, fmt.Errorf("got a tolerance of %s, want at most %d %%: a graduation that far off measures nothing",
			s.tolerance.Written(), widestTolerance)
	}
	if in.PumpStep.Value.Given() {
		s.step = in.PumpStep.Value
	}
	s.dualNames = in.DualNames
	s.edition = in.Edition.Value
	if in.Anticoagulants.Value == order.Teal {
		s.region = order.Teal
	}
	s.jurisdiction = in.Jurisdiction.Value
	if in.BolusUseBy.Value > 0 {
		s.bolus = useByPolicy{int64(in.BolusUseBy.Value / time.Minute), "site policy in the order file"}
	}
	if in.InfusionUseBy.Value > 0 {
		s.infusion = useByPolicy{int64(in.InfusionUseBy.Value / time.Minute), "site policy in the order file"}
	}
	if len(in.Barrels) > 0 {
		s.barrels = nil
		for _, f := range in.Barrels {
			if !f.Value.Given() {
				continue // refused when it was read
			}
			b, ok := syringe.Find(f.Value)
			if !ok {
				return s, fmt.Errorf("got a barrel of %q, want one of %s, whose graduations are on record", f.Text, knownSizes(s.style))
			}
			s.barrels = append(s.barrels, b)
		}
		if len(s.barrels) == 0 {
			s.barrels = syringe.Stocked()
		}
	}
	return s, nil
}

// knownSizes lists the barrels whose graduations are on record.
func knownSizes(style quantity.Style) string {
	var out []string
	for _, b := range syringe.Known() {
		out = append(out, style.Volume(b.Nominal()))
	}
	return joinOr(out)
}

// takeShelf takes the syringes of the shelf in place of the usual ones. Where the
// order lists sizes of its own, they narrow the shelf.
func (s *site) takeShelf(stock *stock, o order.Order) refusal.List {
	s.stock, s.barrels = stock, stock.barrels
	if len(o.Site.Barrels) == 0 {
		return nil
	}
	var out refusal.List
	s.barrels = nil
	for _, f := range o.Site.Barrels {
		found := false
		for _, b := range stock.barrels {
			if f.Value.Given() && b.Nominal().Cmp(f.Value) == 0 {
				s.barrels, found = append(s.barrels, b), true
			}
		}
		if f.Value.Given() && !found {
			out = append(out, refusal.Reason{
				Code: refusal.SyringeUnknown, Severity: refusal.Refuse, Field: "site.barrels", Got: f.Text, Want: "a size on the shelf", Rule: "R8", Pos: f.Pos,
				Message: fmt.Sprintf("the order counts on a %s syringe, and the shelf has none", s.style.Volume(f.Value)),
				Remedy:  "put it on the shelf, or take it out of the order's list",
			})
		}
	}
	slices.SortFunc(s.barrels, func(a, b syringe.Barrel) int {
		if a.Before(b) {
			return -1
		}
		return 1
	})
	return out
}
