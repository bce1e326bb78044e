package dilution

import (
	"errors"
	"fmt"
	"strings"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/dilution/syringe"
)

// open counts the containers for the drawn volume, by size. It says how many they
// are.
func (w *work) open(t target) (int, bool) {
	m := &w.plan.Mixture
	sizes := w.sizes
	if len(sizes) == 0 {
		sizes = []formulary.Presentation{w.plan.Presentation}
	}
	if len(sizes) == 1 && w.left(sizes[0]) == unlimited {
		n, err := m.DrugVolume.Containers(sizes[0].Volume)
		if err != nil {
			return 0, w.fault(err, t.field, t.pos)
		}
		m.Packs = []Pack{{sizes[0], n}}
		return n, true
	}
	list := make([]size, len(sizes))
	for i, p := range sizes {
		list[i] = size{p.Volume, w.left(p)}
	}
	counts, err := fewest(list, m.DrugVolume)
	if err != nil {
		return 0, w.cannotOpen(err, sizes, t)
	}
	n := 0
	m.Packs = nil
	for i, count := range counts {
		if count > 0 {
			m.Packs = append(m.Packs, Pack{sizes[i], count})
			n += count
		}
	}
	w.plan.Presentation = m.Packs[0].Presentation
	return n, true
}

// left is how many of a presentation the shelf has still; unlimited without a
// shelf, or where it does not count.
func (w *work) left(p formulary.Presentation) int {
	if w.site.stock == nil {
		return unlimited
	}
	if it := w.site.stock.find(w.plan.Drug.Name, p.ID); it != nil {
		return it.left
	}
	return 0
}

// cannotOpen says that the shelf has too little, or that the search was given up.
func (w *work) cannotOpen(err error, sizes []formulary.Presentation, t target) bool {
	s, m := w.plan.Style, w.plan.Mixture
	var few *tooFew
	if errors.As(err, &few) {
		return w.refuse(refusal.Reason{
			Code: refusal.StockShort, Field: "presentation", Got: s.Volume(few.have), Want: s.Volume(m.DrugVolume), Rule: "R10", Pos: t.pos,
			Message: fmt.Sprintf("%s of %s are needed, and what the shelf has left of %s holds %s",
				s.Volume(m.DrugVolume), w.plan.Drug.Name, joinAnd(ids(sizes)), s.Volume(few.have)),
			Remedy: "fetch more, or order less",
		})
	}
	return w.refuse(refusal.Reason{
		Code: refusal.SearchCut, Field: t.field, Got: s.Volume(m.DrugVolume), Want: "fewer containers", Rule: "R8", Pos: t.pos,
		Message: fmt.Sprintf("the search for containers that hold %s was cut short at %d part sums, or at 10,000 containers",
			s.Volume(m.DrugVolume), mostStates),
		Remedy: "check the amount and its unit, or name one presentation in the order",
	})
}

// opened is the volume of all containers that are opened.
func (m Mixture) opened() quantity.Volume {
	var sum quantity.Volume
	for i, pack := range m.Packs {
		if v := pack.Presentation.Volume.Times(pack.Count); i == 0 {
			sum = v
		} else {
			sum = sum.Plus(v)
		}
	}
	return sum
}

// onlyStockedFluid is the one listed diluent that the shelf has, where the order
// names none and the shelf lists its fluids.
func (w *work) onlyStockedFluid() (string, bool) {
	s := w.site.stock
	if s == nil || len(s.fluids) == 0 {
		return "", false
	}
	var have []string
	for _, d := range w.plan.Presentation.Diluents {
		if s.holds(d.Name) {
			have = append(have, d.Name)
		}
	}
	if len(have) != 1 {
		return "", false
	}
	return have[0], true
}

// powderFluid is the first fluid that the powder may be mixed with, of those on
// the shelf where it lists its fluids.
func (w *work) powderFluid(p formulary.Presentation) string {
	if s := w.site.stock; s != nil {
		for _, name := range p.AddFluids {
			if s.holds(name) {
				return name
			}
		}
	}
	return p.AddFluids[0]
}

// measureFluid finds the syringe on the shelf that measures the fluid for a powder:
// it must have a line at the volume, since the strength rests on it.
func (w *work) measureFluid(t target) bool {
	p, s := w.plan.Presentation, w.plan.Style
	if w.site.stock == nil || !p.Powder() {
		return true
	}
	r, err := syringe.Measure(p.Added, w.site.barrels, w.site.smallest, w.site.tolerance)
	if err == nil && r.MovedPercent.Sign() == 0 {
		w.plan.Mixture.AddBarrel = r.Barrel
		return true
	}
	return w.refuse(refusal.Reason{
		Code: refusal.VolumeOffGraduation, Field: "presentation", Got: s.Volume(p.Added), Want: "a syringe with a line there", Rule: "R8", Pos: t.pos, Source: p.Source.Title,
		Message: fmt.Sprintf("no syringe on the shelf has a line at %s, which are added to each %s of %s", s.Volume(p.Added), p.Container, p.ID),
		Remedy:  "put a syringe of another size on the shelf, or take another presentation",
	})
}

// fetchFluids chooses the containers of diluent on the shelf, where it lists any:
// as few as possible, then those that leave least. A bag must be there in the
// size that is ordered.
func (w *work) fetchFluids(t target) bool {
	s, m := w.site.stock, &w.plan.Mixture
	if s == nil || len(s.fluids) == 0 {
		return true
	}
	m.Fluids = nil
	if w.plan.Presentation.Powder() {
		need := w.plan.Presentation.Added.Times(m.Containers)
		if !w.fetch(m.AddFluid, need, true, t) {
			return false
		}
	}
	switch m.Method {
	case Neat:
		return true
	case MakeUpTo:
		return w.fetch(m.Diluent, m.DiluentVolume, false, t)
	case AddTo:
		return w.fetchBag(m.DiluentVolume, t)
	case WithdrawThenAdd:
		return w.fetchBag(m.FinalVolume, t)
	}
	return true
}

// fetch takes containers of one fluid for a volume.
func (w *work) fetch(name string, need quantity.Volume, powder bool, t target) bool {
	var list []size
	var from []*fluid
	for _, f := range w.site.stock.fluids {
		if strings.EqualFold(f.name, name) && f.left != 0 {
			list, from = append(list, size{f.volume, f.left}), append(from, f)
		}
	}
	if need.IsZero() {
		return true
	}
	if len(list) == 0 {
		return w.refuse(w.noFluid(name, need, t))
	}
	counts, err := fewest(list, need)
	var few *tooFew
	switch {
	case errors.As(err, &few):
		return w.refuse(w.noFluid(name, need, t))
	case err != nil:
		return w.cannotOpen(err, nil, t)
	}
	for i, n := range counts {
		if n > 0 {
			w.plan.Mixture.Fluids = append(w.plan.Mixture.Fluids, FluidPack{name, from[i].container, from[i].volume, n, powder})
		}
	}
	return true
}

// fetchBag takes one bag or bottle of the very volume.
func (w *work) fetchBag(v quantity.Volume, t target) bool {
	m := &w.plan.Mixture
	for _, f := range w.site.stock.fluids {
		if strings.EqualFold(f.name, m.Diluent) && f.left != 0 && f.volume.Cmp(v) == 0 && (f.container == "bag" || f.container == "bottle") {
			m.Fluids = append(m.Fluids, FluidPack{m.Diluent, f.container, f.volume, 1, false})
			return true
		}
	}
	return w.refuse(w.noFluid(m.Diluent, v, t))
}

// noFluid says that the shelf lacks the diluent, or enough of it, or the bag.
func (w *work) noFluid(name string, need quantity.Volume, t target) refusal.Reason {
	s := w.plan.Style
	var have []string
	for _, f := range w.site.stock.fluids {
		if strings.EqualFold(f.name, name) && f.left != 0 {
			have = append(have, f.container+" of "+s.Volume(f.volume))
		}
	}
	what, want := s.Volume(need)+" of "+name, "containers of "+name+" that hold it"
	if w.plan.Mixture.InBag {
		what, want = "a bag of "+s.Volume(need)+" of "+name, "a bag of this very size"
	}
	r := refusal.Reason{
		Code: refusal.DiluentNotStocked, Field: "diluent", Got: "none", Want: want, Rule: "R10", Pos: t.pos,
		Message: fmt.Sprintf("the shelf does not have %s", what),
		Remedy:  "fetch it and put it on the shelf's list, or order another listed diluent",
	}
	if len(have) > 0 {
		r.Got = joinAnd(have)
		r.Message += "; it has " + joinAnd(have)
	}
	return r
}
