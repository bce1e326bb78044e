package dilution

import (
	"fmt"
	"maps"
	"slices"
	"strings"

	"drawup/dilution/formulary"
	"drawup/dilution/order"
	"drawup/dilution/refusal"
)

// A way is one way to make a syringe: the order with what it leaves open filled
// in, and what to open for it.
type way struct {
	o order.Syringe
	// sizes are presentations of one strength that may be opened together; the
	// first gives the words.
	sizes   []formulary.Presentation
	allowed bool    // held against its record already
	points  []point // what speaks for it before it is worked, best first
	place   int     // on the shelf
	variant string  // what is filled in that the order leaves open, "" for nothing
	name    string  // what it is called beside the others
}

// mostWays bounds how many ways to make one syringe are worked.
const mostWays = 64

// mostSteps bounds how many lines of the giving syringe are added, one by one,
// until it lasts the hours that are asked for.
const mostSteps = 20

// make finds the best way to make what is ordered and takes it. Where none can
// be made, the reasons carry the best that could be made instead.
func (w *work) make() bool {
	ways, ok := w.ways()
	if !ok {
		return w.instead(false)
	}
	best, all := w.weigh(ways)
	if best == nil && w.o.Dilute.Value && unmeasured(all) {
		if more := w.dilutions(ways); len(more) > 0 {
			neat := all
			best, all = w.weigh(more)
			if best != nil {
				all = append(all, neat...)
			}
		}
	}
	if best == nil {
		w.none(all)
		return w.instead(false)
	}
	w.adopt(best)
	w.diluted()
	w.choose(all)
	return true
}

// ways is every way to make the order: what is on the shelf of each strength, by
// what the order leaves open besides.
func (w *work) ways() ([]way, bool) {
	groups, allowed, ok := w.groups()
	if !ok {
		return nil, false
	}
	if !w.known() {
		return nil, false
	}
	orders, ok := w.orders()
	if !ok {
		return nil, false
	}
	var out []way
	for _, o := range orders {
		for i, g := range groups {
			name := joinAnd(ids(g))
			if o.name != "" {
				name += ", " + o.name
			}
			out = append(out, way{o: o.o, sizes: g, allowed: allowed, points: o.points, place: i, variant: o.name, name: name})
		}
	}
	return w.bounded(out), true
}

// known works what is the same in every way: the dose for this patient, the
// start of the pump where the mixture goes by it.
func (w *work) known() bool {
	switch {
	case !w.o.Infusion && w.o.Dose.Given() && w.doseIsWhole():
		return w.pickDose()
	case w.o.Hours.Given() || w.o.Mixture.Given():
		_, ok := w.startPart()
		return ok
	}
	return true
}

// bounded cuts what is more than anybody waits for, and says so.
func (w *work) bounded(list []way) []way {
	if len(list) <= mostWays {
		return list
	}
	w.caution(refusal.Reason{
		Code: refusal.SearchCut, Field: "presentation", Rule: "R8", Pos: w.o.Pos,
		Got: fmt.Sprintf("%d ways", len(list)), Want: fmt.Sprintf("at most %d", mostWays),
		Message: "there are more ways to make this than are looked at; there may be a better one",
		Remedy:  "name the presentation in the order",
	})
	return list[:mostWays]
}

// groups is what may be opened: the ordered presentation; without a shelf the
// only one that is listed; from a shelf all that it has, those of one strength
// together. allowed says that they were held against their records.
func (w *work) groups() (list [][]formulary.Presentation, allowed, ok bool) {
	s := w.site.stock
	if s == nil || w.o.Presentation.Given() {
		if !w.choosePresentation() {
			return nil, false, false
		}
		p := w.plan.Presentation
		if s != nil && s.find(w.plan.Drug.Name, p.ID) == nil {
			return nil, false, w.refuse(w.notStocked(p.ID))
		}
		return [][]formulary.Presentation{{p}}, true, true
	}
	items := s.of(w.plan.Drug.Name)
	if len(items) == 0 {
		return nil, false, w.refuse(w.notStocked(""))
	}
	usable := w.usable()
	var keys []string
	byKey := map[string][]formulary.Presentation{}
	for _, it := range items {
		if !slices.ContainsFunc(usable, func(p formulary.Presentation) bool { return p.ID == it.presentation.ID }) {
			continue
		}
		key := it.likeness
		if _, seen := byKey[key]; !seen {
			keys = append(keys, key)
		}
		byKey[key] = append(byKey[key], *it.presentation)
	}
	for _, k := range keys {
		list = append(list, byKey[k])
	}
	if len(list) == 0 {
		return nil, false, w.refuse(refusal.Reason{
			Code: refusal.NoneStockedFits, Field: "presentation", Got: joinAnd(idsOf(items)), Want: "a presentation for " + w.use(), Rule: "R10", Pos: w.o.Pos,
			Message: fmt.Sprintf("nothing on the shelf of %s is listed for use as %s", w.plan.Drug.Name, w.use()),
			Remedy:  "fetch one of: " + joinOr(ids(usable)),
		})
	}
	return list, false, true
}

func idsOf(items []*item) []string {
	var out []string
	for _, it := range items {
		out = append(out, fmt.Sprintf("%q", it.presentation.ID))
	}
	return out
}

// likeness is the same text for presentations that may be opened together: of one
// strength, form and record. Powders are mixed one by one, so that each stands
// alone.
func likeness(p formulary.Presentation) string {
	if p.Powder() || !p.Volume.Given() {
		return p.ID
	}
	c, err := p.Amount.In(p.Volume)
	if err != nil {
		return p.ID
	}
	parts := []string{c.Rat().RatString(), p.Form, p.SecondName, p.Assay.Text, fmt.Sprint(p.Neat, p.AgeFrom), strings.Join(p.Routes, "|"), strings.Join(p.Uses, "|")}
	if p.SecondName != "" {
		if second, err := p.SecondAmount.In(p.Volume); err == nil {
			parts = append(parts, second.Rat().RatString())
		}
	}
	for _, list := range [][]formulary.Diluent{p.Diluents, p.Forbidden} {
		for _, d := range list {
			parts = append(parts, d.Name, d.Low.Text, d.High.Text)
		}
		parts = append(parts, ";")
	}
	if p.Preserved != nil {
		parts = append(parts, "preserved "+p.Preserved.Text)
	}
	if p.NotForPump != nil {
		parts = append(parts, "not for a pump")
	}
	return strings.Join(parts, "\n")
}

// notStocked says that the shelf lacks the ordered presentation, or the drug.
func (w *work) notStocked(id string) refusal.Reason {
	d, s := w.plan.Drug, w.site.stock
	have := idsOf(s.of(d.Name))
	r := refusal.Reason{
		Code: refusal.NotStocked, Field: "presentation", Got: w.o.Presentation.Text, Want: joinOr(have), Rule: "R10", Pos: w.o.Presentation.Pos,
		Message: fmt.Sprintf("%q of %s is not on the shelf", id, d.Name),
		Remedy:  "fetch it and put it on the shelf's list",
	}
	switch {
	case id == "":
		r.Got, r.Want, r.Pos = "nothing of "+d.Name, joinOr(ids(w.usable())), w.o.Drug.Pos
		r.Message = fmt.Sprintf("the shelf has no %s", d.Name)
		r.Remedy = "fetch one of: " + joinOr(ids(w.usable())) + "; then put it on the shelf's list"
	case len(have) > 0:
		r.Remedy += "; the shelf has " + joinAnd(have)
	}
	return r
}

// A variant is the order with something filled in that it leaves open.
type variant struct {
	o      order.Syringe
	name   string
	points []point
}

// orders is the order as it stands, or one for each standard preparation where
// only the hours are given.
func (w *work) orders() ([]variant, bool) {
	if w.o.Infusion && w.o.Hours.Given() && !w.o.Standard.Given() && !w.o.MixAmount.Given() && !w.o.Mixture.Given() && !w.o.Concentration.Given() {
		return w.standards()
	}
	return []variant{{o: w.o}}, true
}

// try works a way on a copy, up to the mixture. Its reasons are its own.
func (w *work) try(y way, steps int) *work {
	t := *w
	t.reasons, t.trying, t.steps, t.noted = nil, true, steps, maps.Clone(w.noted)
	t.o, t.sizes, t.plan.Presentation = y.o, y.sizes, y.sizes[0]
	if w.plan.Dose != nil {
		d := *w.plan.Dose
		d.Down = false
		t.plan.Dose = &d
	}
	t.stopped = !(y.allowed || t.permitted()) || !t.mix()
	return &t
}

// finish works the rest of a way. A syringe that is sized by the hours it lasts
// gets more, line by line, until it does: moving the drug to a graduation can
// make the pump run a step faster.
func (w *work) finish(y way, t *work) *work {
	for steps := 1; ; steps++ {
		if !t.stopped {
			t.stopped = !t.rest() || t.reasons.Refused()
		}
		if !t.short || steps > mostSteps {
			break
		}
		t = w.try(y, steps)
	}
	if t.short {
		t.refuse(t.hoursCut())
	}
	return t
}

// A trial is a way with what became of it.
type trial struct {
	*way
	work   *work
	points []point // all that counts, best first; nil where it cannot be mixed
}

// weigh works every way and returns the best that can be made, and all of them
// with the best first.
func (w *work) weigh(ways []way) (*work, []trial) {
	all := make([]trial, len(ways))
	for i, y := range ways {
		all[i] = trial{way: &ways[i], work: w.try(y, 0)}
		if !all[i].work.stopped {
			all[i].points = append(append([]point{}, y.points...), all[i].work.score(y.place)...)
		}
	}
	slices.SortStableFunc(all, func(a, b trial) int { return comparePoints(a.points, b.points) })
	for i, t := range all {
		if t.work.stopped {
			continue
		}
		all[i].work = w.finish(*t.way, t.work)
		if !all[i].work.stopped {
			return all[i].work, append([]trial{all[i]}, slices.Delete(slices.Clone(all), i, i+1)...)
		}
	}
	return nil, all
}

// adopt takes a way as the syringe's own.
func (w *work) adopt(t *work) {
	w.plan, w.o, w.sizes, w.doseOK, w.noted = t.plan, t.o, t.sizes, t.doseOK, t.noted
	w.reasons = append(w.reasons, t.reasons...)
}

// none gives the reasons why no way can be made: those of the only one, or those
// that all share, or one that names what is wrong with each.
func (w *work) none(all []trial) {
	first := all[0].work
	for _, t := range all[1:] {
		if !slices.Equal(t.work.reasons.Refusals().Codes(), first.reasons.Refusals().Codes()) {
			w.refuse(w.eachRefused(all))
			return
		}
	}
	w.adopt(first)
}

// eachRefused says what is wrong with each way, the first reason of each.
func (w *work) eachRefused(all []trial) refusal.Reason {
	var parts []string
	seen := map[string]bool{}
	for _, t := range all {
		refused := t.work.reasons.Refusals()
		if len(refused) == 0 {
			continue
		}
		if text := t.name + ": " + refused[0].Message; !seen[text] && len(parts) < 8 {
			seen[text] = true
			parts = append(parts, text)
		}
	}
	return refusal.Reason{
		Code: refusal.NoneStockedFits, Field: "presentation", Got: fmt.Sprintf("%d ways", len(all)), Want: "one that can be made",
		Rule: "R8", Pos: w.o.Pos,
		Message: fmt.Sprintf("nothing that there is of %s can be made into what is ordered; %s", w.plan.Drug.Name, strings.Join(parts, "; ")),
		Remedy:  "mend the order, or fetch another presentation",
	}
}

// unmeasured reports that every way failed, and at least one of them only because
// its volume cannot be measured.
func unmeasured(all []trial) bool {
	return slices.ContainsFunc(all, func(t trial) bool {
		codes := t.work.reasons.Refusals().Codes()
		return len(codes) > 0 && !slices.ContainsFunc(codes, func(c refusal.Code) bool { return !measuring(c) })
	})
}

// measuring reports the codes that say that a volume cannot be measured.
func measuring(c refusal.Code) bool {
	switch c {
	case refusal.VolumeBelowMeasurable, refusal.VolumeOffGraduation, refusal.RoundedPastLimit, refusal.VolumeAboveSyringe:
		return true
	}
	return false
}
