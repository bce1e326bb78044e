package dilution

import (
	"fmt"
	"math/big"
	"slices"
	"strings"

	"drawup/dilution/formulary"
	"drawup/dilution/order"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/dilution/syringe"
)

// instead looks for the best that can be made in place of what was refused
// because it cannot be measured, or is not there, and puts it into the first such
// reason, worked in full. It returns made as it is.
func (w *work) instead(made bool) bool {
	if made || w.trying || w.fixed != nil {
		return made
	}
	i := slices.IndexFunc(w.reasons, func(r refusal.Reason) bool { return r.Severity == refusal.Refuse && replaceable(r.Code) })
	if i < 0 || slices.ContainsFunc(w.reasons.Refusals(), func(r refusal.Reason) bool { return !replaceable(r.Code) }) {
		return made // something else is wrong as well: mend that first
	}
	best := w.alternative()
	if best == nil {
		return made
	}
	in := w.insteadOf(best)
	w.reasons[i].Instead, w.reasons[i].Remedy = in, in.Says
	return made
}

// replaceable reports the codes for which another preparation may be the answer.
func replaceable(c refusal.Code) bool {
	switch c {
	case refusal.NotStocked, refusal.StockShort, refusal.NoneStockedFits, refusal.HoursNotReached, refusal.SyringeNotForPump,
		refusal.SyringeUnknown, refusal.DiluentNotStocked:
		return true
	}
	return measuring(c)
}

// alternative is the best other way: the same order in another size of syringe,
// or with another listed diluent that is there; from another presentation; the
// dose diluted; the same concentration in a volume that a syringe holds and
// shows; a standard preparation that lasts; fewer doses. The first kind that can
// be made is taken.
func (w *work) alternative() *work {
	fresh := *w
	fresh.o, fresh.reasons, fresh.noted, fresh.sizes, fresh.holder = w.plan.Order, nil, nil, nil, syringe.Barrel{}
	fresh.plan.Standard, fresh.trying = "", true
	if fresh.plan.Presentation.ID == "" && !fresh.o.Infusion && fresh.o.Dose.Given() && !fresh.pickDose() {
		return nil
	}
	others := fresh.others()
	for _, ways := range [][]way{fresh.unsized(), fresh.refluid(), others, fresh.diluting(others), fresh.resized(), fresh.lasting(others), fresh.fewer()} {
		ways = ways[:min(len(ways), mostWays)]
		if len(ways) == 0 {
			continue
		}
		if best, _ := fresh.weigh(ways); best != nil {
			return best
		}
	}
	return nil
}

// itself is the ordered presentation, or the one that was tried, if the shelf has
// any of it.
func (w *work) itself() []formulary.Presentation {
	if p := w.plan.Presentation; p.ID != "" && p.Volume.Given() && w.left(p) != 0 {
		return []formulary.Presentation{p}
	}
	return nil
}

// unsized is the order without its size of syringe, where it has one.
func (w *work) unsized() []way {
	own := w.itself()
	if !w.o.Size.Given() || own == nil {
		return nil
	}
	o := w.o
	o.Size = order.Field[quantity.Volume]{}
	return []way{{o: o, sizes: own}}
}

// refluid is the order with each other listed diluent that is on the shelf.
func (w *work) refluid() []way {
	own, s := w.itself(), w.site.stock
	if s == nil || own == nil || !w.o.Diluent.Given() {
		return nil
	}
	var out []way
	for i, d := range own[0].Diluents {
		if !strings.EqualFold(d.Name, w.o.Diluent.Value) && s.holds(d.Name) {
			o := w.o
			o.Diluent = order.Field[string]{Value: d.Name, Text: d.Name, Pos: w.o.Diluent.Pos}
			out = append(out, way{o: o, sizes: own, place: i})
		}
	}
	return out
}

// fewer is the order with fewer doses, the most first.
func (w *work) fewer() []way {
	own := w.itself()
	if own == nil || w.o.Doses.Value < 2 {
		return nil
	}
	var out []way
	for n := w.o.Doses.Value - 1; n > 0; n-- {
		o := w.o
		o.Doses = order.Field[int]{Value: n, Text: fmt.Sprint(n), Pos: w.o.Doses.Pos}
		out = append(out, way{o: o, sizes: own, points: []point{{big.NewRat(int64(-n), 1), nil}}})
	}
	return out
}

// others are the presentations that have not been tried: of the shelf, else of
// the formulary.
func (w *work) others() []way {
	var list []formulary.Presentation
	for _, p := range w.usable() {
		tried := w.o.Presentation.Given() && strings.EqualFold(p.ID, strings.TrimSpace(w.o.Presentation.Value))
		if w.site.stock == nil {
			tried = p.ID == w.plan.Presentation.ID
		}
		there := w.site.stock == nil || w.site.stock.find(w.plan.Drug.Name, p.ID) != nil
		if !tried && there && p.Volume.Given() {
			list = append(list, p)
		}
	}
	var out []way
	for i, p := range list {
		out = append(out, way{o: w.o, sizes: []formulary.Presentation{p}, place: i, name: fmt.Sprintf("%q", p.ID)})
	}
	return out
}

// diluting are dilutions of a dose: of one ordered alone, or of one that the
// ordered mixture does not let anybody measure.
func (w *work) diluting(others []way) []way {
	if w.o.Infusion || !w.o.Dose.Given() || w.o.Doses.Given() || w.plan.Dose == nil {
		return nil
	}
	o := w.o
	o.Amount, o.Concentration, o.Volume = order.Field[quantity.Amount]{}, order.Field[quantity.Concentration]{}, order.Field[quantity.Volume]{}
	var from []way
	if own := w.itself(); own != nil {
		from = append(from, way{sizes: own})
	}
	for _, y := range others {
		y.place++
		from = append(from, y)
	}
	for i := range from {
		from[i].o = w.withFluid(o, from[i].sizes[0])
	}
	return w.dilutions(from)
}

// withFluid fills in a diluent that the order does not name: the first listed that
// is there. It is only offered, never taken.
func (w *work) withFluid(o order.Syringe, p formulary.Presentation) order.Syringe {
	if o.Diluent.Given() {
		return o
	}
	for _, d := range p.Diluents {
		if s := w.site.stock; s == nil || len(s.fluids) == 0 || s.holds(d.Name) {
			o.Diluent = order.Field[string]{Value: d.Name, Text: d.Name, Pos: o.Pos}
			return o
		}
	}
	return o
}

// resized are the ordered concentration in the volumes that the syringes show:
// the nearest line below and above, and the largest syringe that may be filled.
func (w *work) resized() []way {
	p := w.plan.Presentation
	v, c := w.o.Volume.Value, w.o.Concentration.Value
	mixed := w.o.Infusion && w.o.MixAmount.Value.Given()
	switch {
	case p.ID == "" || w.o.Standard.Given():
		return nil
	case mixed:
		v = w.o.MixVolume.Value
		c, _ = w.o.MixAmount.Value.In(v)
	case w.o.Mixture.Given() && !v.Given():
		v, _ = quantity.ParseVolume(volumeOfRule(w.o.Mixture.Value))
	case w.o.Amount.Given() && v.Given():
		c, _ = w.o.Amount.Value.In(v)
	}
	if !v.Given() || !c.Given() && !w.o.Mixture.Given() {
		return nil
	}
	var out []way
	seen := map[string]bool{v.Exact(): true}
	for _, to := range w.shownVolumes(v) {
		if seen[to.Exact()] || to.IsZero() {
			continue
		}
		seen[to.Exact()] = true
		o, ok := w.ofVolume(c, to, mixed)
		far := new(big.Rat).Sub(to.Rat(), v.Rat())
		if ok {
			out = append(out, way{o: o, sizes: []formulary.Presentation{p}, points: []point{{far.Abs(far), nil}}})
		}
	}
	return out
}

// shownVolumes are the lines below and above v of every syringe that may be
// filled, and its full capacity.
func (w *work) shownVolumes(v quantity.Volume) []quantity.Volume {
	var out []quantity.Volume
	for _, b := range w.site.barrels {
		if w.notForPump(b) || w.o.Size.Given() && b.Nominal().Cmp(w.o.Size.Value) != 0 {
			continue
		}
		if b.Nominal().Cmp(v) <= 0 {
			out = append(out, b.Nominal())
			continue
		}
		for _, way := range []quantity.Direction{quantity.Down, quantity.Up} {
			if to, _, err := v.ToStep(b.Step(), way); err == nil && to.Cmp(b.Nominal()) <= 0 {
				out = append(out, to)
			}
		}
	}
	return out
}

// ofVolume is the order with the same concentration in another volume.
func (w *work) ofVolume(c quantity.Concentration, to quantity.Volume, mixed bool) (order.Syringe, bool) {
	o := w.o
	text := to.Exact() + " mL"
	if w.o.Mixture.Given() || o.Concentration.Given() {
		o.Volume = order.Field[quantity.Volume]{Value: to, Text: text, Pos: o.Pos}
		o.Amount = order.Field[quantity.Amount]{}
		return o, true
	}
	a, err := to.Holds(c)
	if err != nil {
		return o, false
	}
	amount := a.Exact(a.Best()) + " " + a.Best().String()
	if strings.Contains(amount, "/") {
		return o, false // nobody can write it into an order
	}
	if mixed {
		o.MixAmount = order.Field[quantity.Amount]{Value: a, Text: amount + " in " + text, Pos: o.Pos}
		o.MixVolume = order.Field[quantity.Volume]{Value: to, Text: amount + " in " + text, Pos: o.Pos}
		return o, true
	}
	o.Amount = order.Field[quantity.Amount]{Value: a, Text: amount, Pos: o.Pos}
	o.Volume = order.Field[quantity.Volume]{Value: to, Text: text, Pos: o.Pos}
	return o, true
}

// lasting are the standard preparations, for hours that the ordered mixture does
// not last.
func (w *work) lasting(others []way) []way {
	if !w.o.Infusion || !w.o.Hours.Given() {
		return nil
	}
	o := w.o
	o.Standard, o.MixAmount, o.MixVolume = order.Field[string]{}, order.Field[quantity.Amount]{}, order.Field[quantity.Volume]{}
	o.Concentration, o.Volume, o.Mixture = order.Field[quantity.Concentration]{}, order.Field[quantity.Volume]{}, order.Field[string]{}
	t := *w
	t.o = o
	variants, ok := t.standards()
	if !ok {
		return nil
	}
	var from []way
	if own := w.itself(); own != nil {
		from = append(from, way{sizes: own})
	}
	var out []way
	for _, x := range variants {
		for i, y := range append(from, others...) {
			y.o, y.points, y.place = x.o, x.points, i
			out = append(out, y)
		}
	}
	return out
}

// insteadOf writes an alternative down.
func (w *work) insteadOf(t *work) *refusal.Instead {
	p, m, s := t.plan, t.plan.Mixture, t.plan.Style
	in := &refusal.Instead{
		Presentation: p.Presentation.ID, Containers: m.Containers, Method: m.Method.String(), Diluent: m.Diluent,
		DrugVolume: volumeFigure(s, m.DrugVolume), FinalVolume: volumeFigure(s, m.FinalVolume), DiluentVolume: volumeFigure(s, m.DiluentVolume),
		MeasuringSyringe: volumeFigure(s, m.DrugReading.Barrel.Nominal()), GivingSyringe: volumeFigure(s, m.FinalBarrel.Nominal()),
		Amount: amountFigure(s, m.Amount), Concentration: concentrationFigure(s, m.Concentration),
		Write: w.toWrite(t), TakeOut: w.toTakeOut(t),
	}
	if d := p.Dose; d != nil {
		in.DoseVolume, in.DoseDelivered = volumeFigure(s, d.Volume), amountFigure(s, d.Delivered)
	}
	if part := p.Infusion; part != nil {
		in.PumpRate = refusal.Figure{Exact: part.Start.Rate.Exact(), Printed: s.FlowRate(part.Start.Rate), Unit: "mL/h"}
	}
	in.Says = insteadWords(t, in)
	return in
}

func volumeFigure(s quantity.Style, v quantity.Volume) refusal.Figure {
	if !v.Given() {
		return refusal.Figure{}
	}
	return refusal.Figure{Exact: v.Exact(), Printed: s.Volume(v), Unit: "mL"}
}

func amountFigure(s quantity.Style, a quantity.Amount) refusal.Figure {
	return refusal.Figure{Exact: a.Exact(a.Best()), Printed: s.Amount(a), Unit: a.Best().String()}
}

func concentrationFigure(s quantity.Style, c quantity.Concentration) refusal.Figure {
	return refusal.Figure{Exact: c.Exact(c.Best()), Printed: s.Concentration(c), Unit: c.Best().String() + "/mL"}
}

// toWrite is what the order has to say for the alternative.
func (w *work) toWrite(t *work) []refusal.Line {
	var out []refusal.Line
	old, now := w.plan.Order, t.o
	add := func(key, was, is string) {
		if is != "" && is != was {
			out = append(out, refusal.Line{Key: key, Value: is})
		}
	}
	same := strings.EqualFold(strings.TrimSpace(old.Presentation.Value), t.plan.Presentation.ID)
	if !old.Presentation.Given() {
		same = w.site.stock != nil || t.plan.Presentation.ID == w.plan.Presentation.ID
	}
	if !same {
		out = append(out, refusal.Line{Key: "presentation", Value: t.plan.Presentation.ID})
	}
	if old.Size.Given() && !now.Size.Given() {
		out = append(out, refusal.Line{Key: "size", Value: t.plan.Mixture.FinalBarrel.Nominal().Exact() + " mL"})
	}
	if old.Doses.Value != now.Doses.Value {
		return append(out, refusal.Line{Key: "doses", Value: now.Doses.Text})
	}
	if t.plan.Mixture.Diluent != "" {
		add("diluent", old.Diluent.Text, now.Diluent.Text)
	}
	add("standard", old.Standard.Text, now.Standard.Text)
	add("mix", old.MixAmount.Text, now.MixAmount.Text)
	add("amount", old.Amount.Text, now.Amount.Text)
	add("concentration", old.Concentration.Text, now.Concentration.Text)
	if old.Hours.Given() && now.Concentration.Given() && old.Concentration.Given() || now.Doses.Given() {
		return out // the volume follows
	}
	add("volume", old.Volume.Text, now.Volume.Text)
	return out
}

// toTakeOut is the keys that the alternative no longer has.
func (w *work) toTakeOut(t *work) []string {
	old, now := w.plan.Order, t.o
	var out []string
	for _, k := range []struct {
		key     string
		was, is bool
	}{
		{"mix", old.MixAmount.Given(), now.MixAmount.Given()},
		{"standard", old.Standard.Given(), now.Standard.Given()},
		{"mixture", old.Mixture.Given(), now.Mixture.Given()},
		{"one_ml_per_hour", old.Each.Given(), now.Mixture.Given()},
		{"amount", old.Amount.Given(), now.Amount.Given()},
		{"concentration", old.Concentration.Given(), now.Concentration.Given()},
		{"volume", old.Volume.Given(), now.Volume.Given()},
	} {
		if k.was && !k.is {
			out = append(out, k.key)
		}
	}
	return out
}

// insteadWords is an alternative in a sentence: what to draw with what, what it
// then is, and what to write.
func insteadWords(t *work, in *refusal.Instead) string {
	var b strings.Builder
	fmt.Fprintf(&b, "this can be made: %s of %q", in.DrugVolume.Printed, in.Presentation)
	if in.Containers > 1 {
		fmt.Fprintf(&b, ", %d of them,", in.Containers)
	}
	fmt.Fprintf(&b, " with the %s syringe", in.MeasuringSyringe.Printed)
	switch t.plan.Mixture.Method {
	case Neat:
		fmt.Fprintf(&b, ", undiluted, %s", in.Concentration.Printed)
	case MakeUpTo:
		fmt.Fprintf(&b, ", made up with %s to %s in the %s syringe, %s", in.Diluent, in.FinalVolume.Printed, in.GivingSyringe.Printed, in.Concentration.Printed)
	case AddTo, WithdrawThenAdd:
		fmt.Fprintf(&b, " into the bag of %s (%s), %s in all, %s", in.Diluent, in.Method, in.FinalVolume.Printed, in.Concentration.Printed)
	}
	if d := t.plan.Dose; d != nil && d.Volume.Cmp(t.plan.Mixture.FinalVolume) != 0 {
		fmt.Fprintf(&b, "; one dose is then %s and gives %s", in.DoseVolume.Printed, in.DoseDelivered.Printed)
	} else if d != nil {
		fmt.Fprintf(&b, "; it gives %s", in.DoseDelivered.Printed)
	}
	if in.PumpRate.Given() {
		fmt.Fprintf(&b, "; the pump starts at %s", in.PumpRate.Printed)
	}
	if len(in.TakeOut) > 0 {
		fmt.Fprintf(&b, "; take %s out", joinAnd(in.TakeOut))
	}
	for i, l := range in.Write {
		if i == 0 {
			b.WriteString("; write ")
		} else {
			b.WriteString(", ")
		}
		fmt.Fprintf(&b, "%s = %q", l.Key, l.Value)
	}
	return b.String()
}
