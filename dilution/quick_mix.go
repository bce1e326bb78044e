package dilution

import (
	"fmt"
	"strings"

	"drawup/dilution/formulary"
	"drawup/dilution/order"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// A QuickMix is how a bare mixture is made, so that it is held against the
// record of one presentation as an order is: listed diluents, neat or not,
// powders as stored (rules R7, R10).
type QuickMix struct {
	Presentation string          // its id; "" where strength or powder tell which
	Method       Method          // Neat for a powder that is mixed and nothing more
	Powder       quantity.Amount // mixed from so much powder; else not given
	Drug         quantity.Volume // drawn; not given for a powder
	Final        quantity.Volume
}

// Stock is the presentation that the sum draws from: the one named, or the only
// one for the use. It lends its strength to a sum that gives none.
func (q Quick) Stock(f *formulary.Formulary) (formulary.Presentation, refusal.List) {
	w := q.work(f)
	if w.findDrug() {
		w.choosePresentation()
	}
	return w.plan.Presentation, w.told()
}

// mixed holds a mixture against its presentation; or against each that has the
// strength, which must all allow it alike. It returns those that do.
func (w *work) mixed() []formulary.Presentation {
	fits, ok := w.quickStock()
	if !ok {
		return nil
	}
	var passed, stopped []*work
	for _, p := range fits {
		trial := w.trial(p)
		if trial.asStored() {
			passed = append(passed, trial)
		} else {
			stopped = append(stopped, trial)
		}
	}
	switch {
	case len(passed) == 0:
		w.reasons = append(w.reasons, stopped[0].reasons...)
		return nil
	case len(stopped) > 0 || unlikeFluids(passed):
		w.refuse(refusal.Reason{
			Code: refusal.PresentationUnclear, Field: "presentation", Want: joinOr(ids(fits)), Rule: "R10",
			Message: "more than one presentation of " + w.plan.Drug.Name + " fits, and they differ in what they may be mixed with",
			Remedy:  "write presentation = one of: " + joinOr(ids(fits)),
		})
		return nil
	}
	w.plan.Presentation, w.plan.Mixture = passed[0].plan.Presentation, passed[0].plan.Mixture
	w.reasons = append(w.reasons, passed[0].reasons...)
	if !w.routeOfMix() || len(fits) == 1 && !w.opened() {
		return nil
	}
	return fits
}

// trial is w with one presentation, its own reasons and nothing else changed.
func (w *work) trial(p formulary.Presentation) *work {
	t := &work{f: w.f, o: w.o, plan: w.plan, size: w.size, fixed: w.fixed}
	t.plan.Presentation = p
	t.plan.Mixture.Method = w.fixed.Mix.Method
	return t
}

// unlikeFluids reports that the same words chose unlike diluents.
func unlikeFluids(trials []*work) bool {
	for _, t := range trials[1:] {
		if t.plan.Mixture.Diluent != trials[0].plan.Mixture.Diluent {
			return true
		}
	}
	return false
}

// quickStock is the presentations that the sum may draw from.
func (w *work) quickStock() ([]formulary.Presentation, bool) {
	q := w.fixed
	named := q.Mix.Presentation != ""
	if named || !q.Strength.Given() && !q.Mix.Powder.Given() {
		n := len(w.reasons)
		if !w.choosePresentation() {
			return nil, false
		}
		w.reasons = w.reasons[:n] // its cautions come again when it is held against the mixture
		return []formulary.Presentation{w.plan.Presentation}, w.strengthAgrees()
	}
	var fits []formulary.Presentation
	for _, p := range w.usable() {
		c, err := p.Amount.In(p.Volume)
		alike := err == nil && c.Equal(q.Strength)
		if q.Mix.Powder.Given() {
			_, alike = vials(q.Mix.Powder, p)
		}
		if alike {
			fits = append(fits, p)
		}
	}
	if len(fits) > 0 {
		return fits, true
	}
	got := w.plan.Style.Concentration(q.Strength)
	if q.Mix.Powder.Given() {
		got = w.plan.Style.Amount(q.Mix.Powder) + " of powder"
	}
	return nil, w.refuse(refusal.Reason{
		Code: refusal.PresentationUnknown, Field: "presentation", Got: got, Want: joinOr(ids(w.usable())), Rule: "R10",
		Message: fmt.Sprintf("the formulary lists no presentation of %s with %s for use as %s", w.plan.Drug.Name, got, w.use()),
		Remedy:  "compare with the pack in the hand; the formulary has " + joinOr(ids(w.usable())),
	})
}

// vials is how many containers of powder hold an amount; false for another form
// or a part of one.
func vials(a quantity.Amount, p formulary.Presentation) (int, bool) {
	share, err := a.Share(p.Amount)
	if err != nil || !p.Powder() || !share.IsInt() || !share.Num().IsInt64() {
		return 0, false
	}
	return int(share.Num().Int64()), true
}

// strengthAgrees refuses a strength or a powder that the named presentation has
// not.
func (w *work) strengthAgrees() bool {
	p, s := w.plan.Presentation, w.plan.Style
	got := ""
	if c, err := p.Amount.In(p.Volume); w.fixed.Strength.Given() && (err != nil || !c.Equal(w.fixed.Strength)) {
		got = s.Concentration(w.fixed.Strength)
	}
	if _, ok := vials(w.fixed.Mix.Powder, p); w.fixed.Mix.Powder.Given() && !ok {
		got = s.Amount(w.fixed.Mix.Powder) + " of powder"
	}
	if got == "" {
		return true
	}
	return w.refuse(refusal.Reason{
		Code: refusal.ContradictoryAmounts, Field: "presentation", Got: got, Want: p.ID, Rule: "R10", Source: p.Source.Title,
		Message: fmt.Sprintf("%s and %q contradict each other", got, p.ID),
		Remedy:  "give one of the two, as the pack in the hand states it",
	})
}

// asStored holds the mixture against one presentation: age, powder, diluent,
// neat.
func (w *work) asStored() bool {
	if !w.permitted() {
		return false
	}
	if w.fixed.Mix.Powder.Given() {
		return w.mixedAsStored() && w.settleDiluent()
	}
	w.o.Diluent = order.Field[string]{Value: w.fixed.Diluent, Text: w.fixed.Diluent}
	return w.settleDiluent()
}

// mixedAsStored refuses a powder that is mixed with another fluid, or to another
// volume, than its record says.
func (w *work) mixedAsStored() bool {
	p, s, q := w.plan.Presentation, w.plan.Style, w.fixed
	if q.Diluent != "" && !fluidListed(p.AddFluids, q.Diluent) {
		return w.refuse(refusal.Reason{
			Code: refusal.DiluentNotListed, Field: "diluent", Got: q.Diluent, Want: joinOr(quoted(p.AddFluids)),
			Rule: "R10", Source: p.Source.Title,
			Message: fmt.Sprintf("the formulary does not list %s for mixing the powder of %q", q.Diluent, p.ID),
			Remedy:  "use " + joinOr(quoted(p.AddFluids)),
		})
	}
	n, _ := vials(q.Mix.Powder, p)
	want := p.Volume.Times(n)
	if q.Mix.Final.Cmp(want) == 0 {
		return true
	}
	return w.refuse(refusal.Reason{
		Code: refusal.FormularyBlank, Field: "final volume", Got: s.Volume(q.Mix.Final), Want: s.Volume(want),
		Rule: "R7", Source: p.Source.Title,
		Message: fmt.Sprintf("the formulary mixes %d x %q with %s to %s; no other volume is on record",
			n, p.ID, s.Volume(p.Added.Times(n)), s.Volume(want)),
		Remedy: "mix it so, then dilute; or compare the record with the pack in the hand",
	})
}

func fluidListed(list []string, name string) bool {
	for _, f := range list {
		if strings.EqualFold(f, name) {
			return true
		}
	}
	return false
}

// opened cautions when more containers have to be opened than anybody should.
func (w *work) opened() bool {
	p, drug := w.plan.Presentation, w.fixed.Mix.Drug
	if !drug.Given() {
		return true
	}
	n, err := drug.Containers(p.Volume)
	if err != nil {
		return w.fault(err, "drug volume", refusal.Pos{})
	}
	w.plan.Mixture.Containers = n
	if n > mostContainers {
		w.caution(w.manyContainers(n, "drug volume", refusal.Pos{}))
	}
	return true
}

// routeOfMix holds the route against the rows of the drug: no dose is known yet,
// and a drug without rows for this use cannot be ordered either.
func (w *work) routeOfMix() bool {
	if !w.o.Infusion {
		return w.routeOfDoses()
	}
	var routes []string
	for _, r := range w.plan.Drug.Rates {
		routes = append(routes, r.Routes...)
	}
	switch {
	case len(w.plan.Drug.Rates) == 0:
		return w.refuse(w.noLimits("dose rate"))
	case !routeListed(routes, w.plan.Route):
		return w.routeUnlisted(routes)
	}
	return true
}

// AssayOf is the half width of the presentation's assay limits, and whether it
// is assumed because the record has none (rule R9).
func AssayOf(p formulary.Presentation) (quantity.Percent, bool, error) {
	if p.Assay.Given() {
		return p.Assay.Value, false, nil
	}
	a, err := quantity.ParsePercent(assumedAssay)
	return a, true, err
}

// WidestAssay is the widest of the presentations' assay limits, and whether it is
// assumed. Nothing is given for no presentation.
func WidestAssay(list []formulary.Presentation) (widest quantity.Percent, assumed bool, err error) {
	for _, p := range list {
		a, blank, err := AssayOf(p)
		if err != nil {
			return widest, assumed, err
		}
		if !widest.Given() || a.Rat().Cmp(widest.Rat()) > 0 {
			widest, assumed = a, blank
		}
	}
	return widest, assumed, nil
}
