package dilution

import (
	"fmt"
	"math/big"
	"slices"
	"strings"

	"drawup/dilution/refusal"
	"drawup/dilution/syringe"
)

// A Choice is one thing that the planner settled, and why. Against are the
// alternatives that were weighed; they are kept on request only.
type Choice struct {
	What, Took, Why string
	Against         []Weighed
}

// A Weighed is an alternative that lost. Code is that of the refusal, "" where it
// could have been made as well.
type Weighed struct {
	Option, Why string
	Code        refusal.Code
}

// choose writes down what was settled for the syringe; all is every way that was
// weighed, the taken one first.
func (w *work) choose(all []trial) {
	w.plan.Choices = []Choice{w.presentationChoice(all), w.containerChoice()}
	add := func(c Choice) {
		if c.What != "" {
			w.plan.Choices = append(w.plan.Choices, c)
		}
	}
	add(w.mixtureChoice(all))
	add(w.powderChoice())
	add(w.measuringChoice())
	add(w.givingChoice())
	add(w.diluentChoice())
	add(w.fluidChoice())
	add(w.stepsChoice())
}

// presentationChoice is which presentation is opened, and against which others.
func (w *work) presentationChoice(all []trial) Choice {
	c := Choice{What: "presentation", Took: packNames(w.plan.Mixture.Packs)}
	others := unlike(all, func(a, b *way) bool { return a.place != b.place || a.variant == b.variant })
	switch {
	case w.plan.Order.Presentation.Given():
		c.Why = "it is the one that is ordered"
	case w.site.stock == nil:
		c.Why = "it is the only one that the formulary lists for use as " + w.use()
	case len(others) == 0:
		c.Why = "it is the only strength on the shelf that is listed for use as " + w.use()
	default:
		c.Why = "nothing else on the shelf can be made into what is ordered"
		for _, t := range others {
			if t.points != nil && !t.work.stopped {
				c.Why = bestBy(all[0].points, t.points)
				break
			}
		}
	}
	c.Against = w.against(all[0], others, func(t trial) string { return t.name })
	return c
}

// unlike is every way but the taken one for which pick holds beside it.
func unlike(all []trial, pick func(taken, other *way) bool) []trial {
	var out []trial
	for _, t := range all[1:] {
		if pick(all[0].way, t.way) {
			out = append(out, t)
		}
	}
	return out
}

// against is why ways lost; nothing unless it is asked for.
func (w *work) against(best trial, others []trial, name func(trial) string) []Weighed {
	var out []Weighed
	for _, t := range others {
		if w.site.explain {
			out = append(out, whyLost(best, t, name(t)))
		}
	}
	return out
}

// bestBy says in what the best goes before the next best.
func bestBy(best, next []point) string {
	i := firstUnlike(best, next)
	if i < 0 {
		return "it comes first on the shelf; nothing else tells it from the next"
	}
	return fmt.Sprintf("%s; the next best: %s", best[i].text(), next[i].text())
}

// whyLost says why a way lost.
func whyLost(best, t trial, name string) Weighed {
	out := Weighed{Option: name}
	if refused := t.work.reasons.Refusals(); len(refused) > 0 {
		out.Why, out.Code = "refused: "+refused[0].Message, refused[0].Code
		return out
	}
	i := firstUnlike(best.points, t.points)
	if i < 0 {
		out.Why = "it comes later on the shelf"
		return out
	}
	out.Why = fmt.Sprintf("%s, against %s", t.points[i].text(), best.points[i].text())
	return out
}

// packNames is what is opened: "2 x \"ampoule 30 mg in 1 mL\"".
func packNames(packs []Pack) string {
	var out []string
	for _, p := range packs {
		out = append(out, fmt.Sprintf("%q", p.Presentation.ID))
	}
	return joinAnd(out)
}

// containerChoice is how many containers are opened, of which sizes.
func (w *work) containerChoice() Choice {
	m, s := w.plan.Mixture, w.plan.Style
	var parts []string
	for _, p := range m.Packs {
		parts = append(parts, fmt.Sprintf("%d x %q", p.Count, p.Presentation.ID))
	}
	c := Choice{What: "containers", Took: joinAnd(parts),
		Why: fmt.Sprintf("fewest that hold %s; %s left over", s.Volume(m.DrugVolume), s.Volume(m.LeftVolume))}
	if m.Mixed() {
		c.Why = fmt.Sprintf("fewest that hold %s, of several sizes because that leaves least; %s left over", s.Volume(m.DrugVolume), s.Volume(m.LeftVolume))
	}
	if w.site.explain && len(w.sizes) > 1 {
		c.Against = w.oneSizeAlone()
	}
	return c
}

// oneSizeAlone is what each size by itself would take.
func (w *work) oneSizeAlone() []Weighed {
	m, s := w.plan.Mixture, w.plan.Style
	var out []Weighed
	for _, p := range w.sizes {
		n, err := m.DrugVolume.Containers(p.Volume)
		if err != nil || !m.Mixed() && m.Packs[0].Presentation.ID == p.ID {
			continue
		}
		left, err := p.Volume.Times(n).Minus(m.DrugVolume)
		if err != nil {
			continue
		}
		why := fmt.Sprintf("%s, %s left over", counting(n, "container"), s.Volume(left))
		if have := w.left(p); have != unlimited && have < n {
			why = fmt.Sprintf("the shelf has %d of the %d that it takes", have, n)
		}
		out = append(out, Weighed{Option: fmt.Sprintf("%q alone", p.ID), Why: why})
	}
	return out
}

// mixtureChoice is a concentration, a volume or a standard preparation that the
// order left open.
func (w *work) mixtureChoice(all []trial) Choice {
	o, m, s := w.plan.Order, w.plan.Mixture, w.plan.Style
	others := w.against(all[0], unlike(all, func(a, b *way) bool { return a.place == b.place && a.variant != b.variant }), func(t trial) string {
		if t.variant == "" {
			return "undiluted"
		}
		return t.variant
	})
	switch {
	case o.Dilute.Value && w.o.Concentration.Given():
		return Choice{What: "concentration", Against: others, Took: s.Concentration(m.Concentration) + ", made up to " + s.Volume(m.FinalVolume),
			Why: "the neat dose cannot be measured; of the dilutions that the formulary allows it has the smallest total error"}
	case o.Infusion && !o.Standard.Given() && w.o.Standard.Given():
		return Choice{What: "standard preparation", Against: others, Took: w.o.Standard.Value,
			Why: "of those for this line that last the hours it holds least drug"}
	case o.Infusion && !o.Volume.Given() && w.o.Volume.Given() && o.Hours.Given():
		return Choice{What: "final volume", Took: s.Volume(m.FinalVolume), Why: "the next line that lasts the hours at the start rate, with what fills the line and stays behind"}
	case o.Doses.Given() && !o.Volume.Given():
		return Choice{What: "final volume", Took: s.Volume(m.FinalVolume), Why: fmt.Sprintf("%d doses as they are read, so that the last is whole", o.Doses.Value)}
	}
	return Choice{}
}

// powderChoice is the syringe that measures the fluid for a powder.
func (w *work) powderChoice() Choice {
	b, p, s := w.plan.Mixture.AddBarrel, w.plan.Presentation, w.plan.Style
	if !b.Given() {
		return Choice{}
	}
	best := b.Look(p.Added)
	c := Choice{What: "syringe for the powder", Took: s.Volume(b.Nominal()), Why: "the smallest that has a line at " + s.Volume(p.Added)}
	if w.site.explain {
		c.Against = w.otherBarrels(b, func(x syringe.Barrel) string { return w.whyNotMeasure(best, x.Look(p.Added)) })
	}
	return c
}

// measuringChoice is the syringe that measures the drug.
func (w *work) measuringChoice() Choice {
	m, s := w.plan.Mixture, w.plan.Style
	b := m.DrugReading.Barrel
	best := b.Look(m.DrugWanted)
	c := Choice{What: "measuring syringe", Took: s.Volume(b.Nominal())}
	switch {
	case best.Holds && best.Moved.Sign() == 0 && !best.UnderFifth:
		c.Why = "the smallest that has a line at " + s.Volume(m.DrugVolume)
	case best.Holds && best.Moved.Sign() == 0:
		c.Why = "the smallest that holds " + s.Volume(m.DrugVolume) + ", which is under a fifth of it"
	default:
		c.Why = "of those that hold " + s.Volume(m.DrugWanted) + " its line is nearest"
	}
	if w.site.explain {
		c.Against = w.otherBarrels(b, func(x syringe.Barrel) string { return w.whyNotMeasure(best, x.Look(m.DrugWanted)) })
	}
	return c
}

// whyNotMeasure says why a barrel does not measure the drug.
func (w *work) whyNotMeasure(best, look syringe.Look) string {
	s := w.plan.Style
	switch {
	case !look.Holds:
		return "too small"
	case look.Line.IsZero():
		return "no line near it"
	case look.UnderFifth && !best.UnderFifth:
		return s.Volume(look.Line) + " is under a fifth of it"
	case look.Moved.Cmp(best.Moved) > 0:
		return "its nearest line is " + s.Volume(look.Line)
	case look.Barrel.Nominal().Cmp(best.Barrel.Nominal()) > 0:
		return "larger"
	}
	return "its lines are wider apart"
}

// otherBarrels is every other stocked barrel with what speaks against it.
func (w *work) otherBarrels(taken syringe.Barrel, why func(syringe.Barrel) string) []Weighed {
	s := w.plan.Style
	var out []Weighed
	for _, b := range w.site.barrels {
		if sameBarrel(b, taken) {
			continue
		}
		name := s.Volume(b.Nominal())
		if slices.ContainsFunc(w.site.barrels, func(x syringe.Barrel) bool { return x.Nominal().Cmp(b.Nominal()) == 0 && !sameBarrel(x, b) }) {
			name += " in steps of " + s.Volume(b.Step())
		}
		out = append(out, Weighed{Option: name, Why: why(b)})
	}
	return out
}

// givingChoice is the syringe that is filled.
func (w *work) givingChoice() Choice {
	m, s := w.plan.Mixture, w.plan.Style
	if m.InBag {
		return Choice{}
	}
	c := Choice{What: "giving syringe", Took: s.Volume(m.FinalBarrel.Nominal()), Why: "the smallest that holds " + s.Volume(m.FinalVolume)}
	if w.o.Size.Given() {
		c.Why = "it is the size that is ordered"
	} else if w.holder.Given() && w.plan.Order.Doses.Given() {
		c.Why = "the smallest that holds the doses and shows one of them"
	}
	if w.o.Infusion && w.site.stock != nil && len(w.site.stock.pumps) > 0 {
		c.Why += ", and it fits " + joinAnd(w.site.stock.pumpsFor(m.FinalBarrel.Nominal()))
	}
	if w.site.explain {
		c.Against = w.otherBarrels(m.FinalBarrel, w.whyNotGive)
	}
	return c
}

// whyNotGive says why a barrel is not the one that is filled.
func (w *work) whyNotGive(b syringe.Barrel) string {
	m := w.plan.Mixture
	look := b.Look(m.FinalVolume)
	switch {
	case w.o.Size.Given() && b.Nominal().Cmp(w.o.Size.Value) != 0:
		return "another size is ordered"
	case !look.Holds:
		return "too small"
	case w.notForPump(b):
		return "no pump takes it"
	case look.Moved.Sign() != 0 && m.Method != Neat:
		return "it has no line at " + w.plan.Style.Volume(m.FinalVolume)
	case b.Nominal().Cmp(m.FinalBarrel.Nominal()) > 0:
		return "larger"
	}
	return "its lines are wider apart, or it does not show one dose"
}

// diluentChoice is a diluent that the order does not name.
func (w *work) diluentChoice() Choice {
	m := w.plan.Mixture
	if m.Diluent == "" {
		return Choice{}
	}
	c := Choice{What: "diluent", Took: m.Diluent}
	st, ok := w.plan.Drug.Standard(w.plan.Standard)
	switch {
	case w.plan.Order.Diluent.Given():
		c.Why = "it is the one that is ordered"
	case ok && w.plan.Standard != "" && st.Diluent == m.Diluent:
		c.Why = "the standard preparation names it"
	case len(w.plan.Presentation.Diluents) == 1:
		c.Why = "it is the only one that the formulary lists"
	default:
		c.Why = "it is the only listed one on the shelf"
	}
	if w.site.explain {
		for _, d := range w.plan.Presentation.Diluents {
			if !strings.EqualFold(d.Name, m.Diluent) {
				why := "another is ordered, or goes before it"
				if s := w.site.stock; s != nil && len(s.fluids) > 0 && !s.holds(d.Name) {
					why = "not on the shelf"
				}
				c.Against = append(c.Against, Weighed{Option: d.Name, Why: why})
			}
		}
	}
	return c
}

// fluidChoice is which containers of diluent are fetched.
func (w *work) fluidChoice() Choice {
	m, s := w.plan.Mixture, w.plan.Style
	if len(m.Fluids) == 0 {
		return Choice{}
	}
	var parts []string
	taken := map[string]bool{}
	for _, f := range m.Fluids {
		parts = append(parts, fmt.Sprintf("%d x %s %s of %s", f.Count, s.Volume(f.Volume), f.Container, f.Name))
		taken[f.Container+f.Name+f.Volume.Exact()] = true
	}
	c := Choice{What: "diluent containers", Took: joinAnd(parts), Why: "fewest that hold it, then those that leave least"}
	if m.InBag {
		c.Why = "a bag of the very size"
	}
	if !w.site.explain {
		return c
	}
	for _, f := range w.site.stock.fluids {
		if !taken[f.container+m.Diluent+f.volume.Exact()] && strings.EqualFold(f.name, m.Diluent) {
			c.Against = append(c.Against, Weighed{Option: s.Volume(f.volume) + " " + f.container, Why: w.whyNotFluid(f)})
		}
	}
	return c
}

func (w *work) whyNotFluid(f *fluid) string {
	m, s := w.plan.Mixture, w.plan.Style
	if f.left == 0 {
		return "none left"
	}
	if m.InBag {
		return "another size"
	}
	n, err := m.DiluentVolume.Containers(f.volume)
	if err != nil {
		return "far too small"
	}
	left, err := f.volume.Times(n).Minus(m.DiluentVolume)
	if err != nil {
		return "far too small"
	}
	return fmt.Sprintf("%s, %s left over", counting(n, "container"), s.Volume(left))
}

// stepsChoice is the order in which things are done (rule R5).
func (w *work) stepsChoice() Choice {
	m := w.plan.Mixture
	same := sameBarrel(m.DrugReading.Barrel, m.FinalBarrel)
	c := Choice{What: "order of steps"}
	switch m.Method {
	case Neat:
		c.Took, c.Why = "draw, then label", "nothing is added"
		if !same {
			c.Took, c.Why = "measure, put into the giving syringe, then label", "the giving syringe does not show the volume as well"
		}
	case MakeUpTo:
		c.Took, c.Why = "drug first, in its own syringe, then diluent up to the final volume", "each is measured once, and the final volume is read where it is given from"
		if same {
			c.Took, c.Why = "drug first, then diluent up to the final volume in the same syringe", "one syringe shows both volumes"
		}
	case AddTo:
		c.Took, c.Why = "drug into the full bag", "the order says that it is added: the bag ends up fuller"
	case WithdrawThenAdd:
		c.Took, c.Why = "withdraw first, then the drug", "the bag is never fuller than it was"
	}
	if w.plan.Presentation.Powder() {
		c.Took = "dissolve the powder, " + c.Took
	}
	return c
}

// deadSpaceCounts cautions when the drug is measured and made up in one syringe
// and what stays in the needle, washed in, is more than the site's tolerance.
func (w *work) deadSpaceCounts(t target) {
	st, m, s := w.site.stock, w.plan.Mixture, w.plan.Style
	if st == nil || !st.needle.Given() || m.Method != MakeUpTo {
		return
	}
	if !sameBarrel(m.DrugReading.Barrel, m.FinalBarrel) {
		return
	}
	share := shareOf(st.needle, m.DrugVolume)
	if share == nil || share.Mul(share, big.NewRat(100, 1)).Cmp(w.site.tolerance.Rat()) <= 0 {
		return
	}
	w.caution(refusal.Reason{
		Code: refusal.DeadSpaceCounts, Field: t.field, Got: s.Volume(st.needle), Want: "at most " + s.Percent(w.site.tolerance) + " of the drug", Rule: "R8", Pos: t.pos,
		Message: fmt.Sprintf("the needle holds %s, and %s of the drug are measured and made up in one syringe: what is in the needle is washed in as well",
			s.Volume(st.needle), s.Volume(m.DrugVolume)),
		Remedy: "measure the drug in a syringe of its own, or change the needle before the diluent",
	})
}

// sameBarrel reports whether two barrels are of one size and graduation; no
// barrel is the same as none.
func sameBarrel(a, b syringe.Barrel) bool {
	return a.Given() && b.Given() && a.Nominal().Cmp(b.Nominal()) == 0 && a.Step().Cmp(b.Step()) == 0
}
