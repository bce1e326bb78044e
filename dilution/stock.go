package dilution

import (
	"errors"
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

// A stock is a shelf held against the formulary: its names are the formulary's,
// its barrels keep their standard. What is opened for one syringe is gone for
// the next.
type stock struct {
	file   string
	items  []*item // in the order of the shelf
	fluids []*fluid
	pumps  []pumpOf
	// barrels are sorted, smallest first, the finer of two of one size first.
	barrels []syringe.Barrel
	dead    []quantity.Volume // of the barrels, in their order; may be not given
	needle  quantity.Volume
}

// An item is one presentation on the shelf; left is how many are there still.
type item struct {
	drug         string
	presentation *formulary.Presentation // the formulary's own, never changed
	likeness     string                  // the same for what may be opened together
	left         int
}

// A fluid is one container of a diluent on the shelf.
type fluid struct {
	name, container string
	volume          quantity.Volume
	left            int
}

// A pumpOf is one pump and the sizes of syringe that it takes.
type pumpOf struct {
	name  string
	takes []quantity.Volume
}

// stockOf holds a shelf against the formulary and the standard for syringes.
func stockOf(s order.Shelf, f *formulary.Formulary) (*stock, refusal.List) {
	r := &stocking{f: f, drugs: map[string]formulary.Drug{}, seen: map[string]bool{}}
	out := &stock{file: s.File, needle: s.NeedleDeadSpace.Value}
	for _, x := range s.Stock {
		if it := r.item(x); it != nil {
			out.items = append(out.items, it)
		}
	}
	r.barrels(out, s.Barrels)
	if len(s.Fluids) > 0 {
		r.names = fluidNames(f)
	}
	for _, x := range s.Fluids {
		if fl := r.fluid(x); fl != nil {
			out.fluids = append(out.fluids, fl)
		}
	}
	for _, x := range s.Pumps {
		p := pumpOf{name: x.Name.Value}
		for _, v := range x.Takes {
			if v.Value.Given() {
				p.takes = append(p.takes, v.Value)
			}
		}
		out.pumps = append(out.pumps, p)
	}
	return out, r.list
}

// A stocking is the work of reading a shelf against the formulary.
type stocking struct {
	f     *formulary.Formulary
	drugs map[string]formulary.Drug // found before, by the name on the shelf
	seen  map[string]bool
	names map[string]bool // of fluids that the formulary knows
	list  refusal.List
}

func (r *stocking) refuse(reason refusal.Reason) {
	reason.Severity = refusal.Refuse
	r.list = append(r.list, reason)
}

// counted is how many there are, or unlimited.
func counted(f order.Field[int]) int {
	if f.Value == 0 {
		return unlimited
	}
	return f.Value
}

// item finds one presentation; nil where it is refused.
func (r *stocking) item(x order.Stocked) *item {
	if !x.Drug.Given() || !x.Presentation.Given() {
		return nil // refused when it was read
	}
	d, known := r.drugs[x.Drug.Value]
	if !known {
		var near []string
		if d, near, known = r.f.Find(x.Drug.Value); !known {
			r.refuse(refusal.Reason{
				Code: refusal.DrugUnknown, Field: "stock.drug", Got: x.Drug.Text, Want: "a drug of the formulary", Rule: "R10", Pos: x.Drug.Pos,
				Message: fmt.Sprintf("%q is not in the formulary", x.Drug.Value), Remedy: unknownDrugRemedy(near),
			})
			return nil
		}
		r.drugs[x.Drug.Value] = d
	}
	id := strings.TrimSpace(x.Presentation.Value)
	i := slices.IndexFunc(d.Presentations, func(p formulary.Presentation) bool { return strings.EqualFold(p.ID, id) })
	if i < 0 {
		r.refuse(r.notOfDrug(d, x))
		return nil
	}
	p := &d.Presentations[i]
	if key := d.Name + "\n" + p.ID; !r.seen[key] {
		r.seen[key] = true
		return &item{d.Name, p, likeness(*p), counted(x.Count)}
	}
	r.refuse(refusal.Reason{
		Code: refusal.KeyRepeated, Field: "stock.presentation", Got: x.Presentation.Text, Want: "each ampoule or vial once", Pos: x.Presentation.Pos,
		Message: fmt.Sprintf("the shelf lists %s of %s twice", p.ID, d.Name), Remedy: "keep one entry, with the number of both",
	})
	return nil
}

// notOfDrug says that the drug has no such presentation, and whose it is.
func (r *stocking) notOfDrug(d formulary.Drug, x order.Stocked) refusal.Reason {
	var others []string
	for _, other := range r.f.Drugs() {
		if _, ok := other.Presentation(x.Presentation.Value); ok {
			others = append(others, other.Name)
		}
	}
	reason := refusal.Reason{
		Code: refusal.PresentationUnknown, Field: "stock.presentation", Got: x.Presentation.Text, Want: joinOr(ids(d.Presentations)),
		Rule: "R10", Pos: x.Presentation.Pos,
		Message: fmt.Sprintf("the formulary lists no %q for %s", x.Presentation.Value, d.Name),
		Remedy:  "use one of: " + joinOr(ids(d.Presentations)),
	}
	if len(others) > 0 && len(others) <= 3 {
		reason.Code = refusal.StockOtherDrug
		reason.Message = fmt.Sprintf("the shelf lists %q under %s, and the formulary has it as %s", x.Presentation.Value, d.Name, joinAnd(others))
		reason.Remedy = "look at the ampoule or vial itself, then mend the drug or the presentation; " + d.Name + " has " + joinOr(ids(d.Presentations))
	}
	return reason
}

// unknownDrugRemedy offers the names that may have been meant.
func unknownDrugRemedy(near []string) string {
	if len(near) > 0 {
		return "was " + joinOr(near) + " meant?"
	}
	return "add it to the formulary (whoever keeps it does that), or check the spelling; drawup formulary list shows what there is"
}

// barrels reads the syringes, with the graduation on record where the shelf
// states none, and sorts them.
func (r *stocking) barrels(out *stock, list []order.StockedBarrel) {
	type both struct {
		barrel syringe.Barrel
		dead   quantity.Volume
	}
	var all []both
	for _, x := range list {
		b, ok := r.barrel(x)
		if !ok {
			continue
		}
		twice := slices.ContainsFunc(all, func(y both) bool {
			return y.barrel.Nominal().Cmp(b.Nominal()) == 0 && y.barrel.Step().Cmp(b.Step()) == 0
		})
		if twice {
			r.refuse(refusal.Reason{
				Code: refusal.KeyRepeated, Field: "barrel.size", Got: x.Size.Text, Want: "each syringe once", Pos: x.Pos,
				Message: fmt.Sprintf("the shelf lists the %s syringe in steps of %s twice", quantity.UK().Volume(b.Nominal()), quantity.UK().Volume(b.Step())),
				Remedy:  "keep one entry",
			})
			continue
		}
		all = append(all, both{b, x.DeadSpace.Value})
	}
	slices.SortFunc(all, func(x, y both) int {
		if x.barrel.Before(y.barrel) {
			return -1
		}
		return 1
	})
	for _, x := range all {
		out.barrels, out.dead = append(out.barrels, x.barrel), append(out.dead, x.dead)
	}
}

// barrel is one syringe, or false where it is refused.
func (r *stocking) barrel(x order.StockedBarrel) (syringe.Barrel, bool) {
	if !x.Size.Value.Given() || x.Step.Given() && !x.Step.Value.Given() {
		return syringe.Barrel{}, false // refused when it was read
	}
	if !x.Step.Given() {
		b, ok := syringe.Find(x.Size.Value)
		if !ok {
			r.refuse(refusal.Reason{
				Code: refusal.SyringeUnknown, Field: "barrel.size", Got: x.Size.Text, Want: "a graduation", Rule: "R8", Pos: x.Size.Pos,
				Message: fmt.Sprintf("the graduation of a %s syringe is not on record", quantity.UK().Volume(x.Size.Value)),
				Remedy:  "read it off the syringe and write, for instance: step = \"0.2 mL\"; on record are " + knownSizes(quantity.UK()),
			})
			return b, false
		}
		return b, r.standard(x, b)
	}
	b, err := syringe.New(x.Size.Value, x.Step.Value, "the shelf")
	if err != nil {
		r.refuse(refusal.Reason{
			Code: refusal.BarrelOffStandard, Field: "barrel.step", Got: x.Step.Text, Want: "a part of " + x.Size.Text, Rule: "R8", Pos: x.Step.Pos,
			Message: fmt.Sprintf("a %s syringe cannot be marked every %s: a full one could not be read", x.Size.Text, x.Step.Text),
			Remedy:  "read size and graduation off the syringe again",
		})
		return b, false
	}
	return b, r.standard(x, b)
}

// standard holds a syringe against the standard.
func (r *stocking) standard(x order.StockedBarrel, b syringe.Barrel) bool {
	err := b.Standard(x.DeadSpace.Value)
	var off *syringe.StandardError
	if err == nil || !errors.As(err, &off) {
		return err == nil
	}
	field, want, source := x.Step, "at most "+quantity.UK().Volume(off.Most), syringe.StandardSource
	switch off.What {
	case "dead space":
		field = x.DeadSpace
	case "capacity":
		field = x.Size
	}
	if off.Own {
		source = "our own bound against slips of the pen; the standard has none"
	}
	if off.Most.IsZero() {
		want = "lines that can be read"
	}
	r.refuse(refusal.Reason{
		Code: refusal.BarrelOffStandard, Field: "barrel", Got: field.Text, Want: want, Rule: "R8", Source: source, Pos: field.Pos,
		Message: fmt.Sprintf("a %s of %s does not go with a %s syringe: %s", off.What, field.Text, x.Size.Text, off.Why),
		Remedy:  "read it off the syringe again, and check the unit",
	})
	return false
}

// fluid is one container of a diluent; nil where it is refused.
func (r *stocking) fluid(x order.StockedFluid) *fluid {
	if !x.Name.Given() || !x.Volume.Value.Given() {
		return nil
	}
	name := strings.ToLower(x.Name.Value)
	if !r.names[name] {
		r.refuse(refusal.Reason{
			Code: refusal.ValueUnknown, Field: "diluent.name", Got: x.Name.Text, Want: "a fluid as the formulary writes it", Rule: "R10", Pos: x.Name.Pos,
			Message: fmt.Sprintf("no drug of the formulary is mixed or diluted with %q", x.Name.Value),
			Remedy:  "write the name as the formulary does, such as \"sodium chloride 0.9 %\" or \"glucose 5 %\", or take the entry out",
		})
		return nil
	}
	key := "fluid\n" + name + "\n" + x.Container.Value + "\n" + x.Volume.Value.Exact()
	if r.seen[key] {
		r.refuse(refusal.Reason{
			Code: refusal.KeyRepeated, Field: "diluent", Got: x.Name.Text + ", " + x.Volume.Text, Want: "each container once", Pos: x.Pos,
			Message: fmt.Sprintf("the shelf lists %s of %s twice", x.Volume.Text, x.Name.Value), Remedy: "keep one entry, with the number of both",
		})
		return nil
	}
	r.seen[key] = true
	return &fluid{name, x.Container.Value, x.Volume.Value, counted(x.Count)}
}

// fluidNames are the fluids that the formulary names anywhere, in small letters.
func fluidNames(f *formulary.Formulary) map[string]bool {
	out := map[string]bool{}
	for _, d := range f.Drugs() {
		for _, p := range d.Presentations {
			for _, list := range [][]formulary.Diluent{p.Diluents, p.Forbidden} {
				for _, fl := range list {
					out[strings.ToLower(fl.Name)] = true
				}
			}
			for _, name := range p.AddFluids {
				out[strings.ToLower(name)] = true
			}
		}
	}
	return out
}

// of lists what the shelf has of a drug, in the order of the shelf.
func (s *stock) of(drug string) []*item {
	var out []*item
	for _, it := range s.items {
		if it.drug == drug {
			out = append(out, it)
		}
	}
	return out
}

// find is the entry of a presentation of a drug, nil where there is none.
func (s *stock) find(drug, id string) *item {
	for _, it := range s.items {
		if it.drug == drug && it.presentation.ID == id {
			return it
		}
	}
	return nil
}

// holds reports whether the shelf has a fluid of this name.
func (s *stock) holds(name string) bool {
	return slices.ContainsFunc(s.fluids, func(f *fluid) bool { return strings.EqualFold(f.name, name) })
}

// deadSpace is what the shelf says stays in a barrel; not given where it says
// nothing.
func (s *stock) deadSpace(b syringe.Barrel) quantity.Volume {
	for i, x := range s.barrels {
		if sameBarrel(x, b) {
			return s.dead[i]
		}
	}
	return quantity.Volume{}
}

// pumpsFor names the pumps that take a size of syringe.
func (s *stock) pumpsFor(nominal quantity.Volume) []string {
	var out []string
	for _, p := range s.pumps {
		if slices.ContainsFunc(p.takes, func(v quantity.Volume) bool { return v.Cmp(nominal) == 0 }) {
			out = append(out, p.name)
		}
	}
	return out
}

// takeAway takes from the shelf what a made syringe has used.
func (s *stock) takeAway(p Plan) {
	for _, pack := range p.Mixture.Packs {
		if it := s.find(p.Drug.Name, pack.Presentation.ID); it != nil && it.left != unlimited {
			it.left -= pack.Count
		}
	}
	for _, pack := range p.Mixture.Fluids {
		for _, f := range s.fluids {
			if f.left != unlimited && strings.EqualFold(f.name, pack.Name) && f.container == pack.Container && f.volume.Cmp(pack.Volume) == 0 {
				f.left -= pack.Count
			}
		}
	}
}

// shareOf is a over b; nil where b is nothing.
func shareOf(a, b quantity.Volume) *big.Rat {
	if !a.Given() || !b.Given() || b.IsZero() {
		return nil
	}
	return new(big.Rat).Quo(a.Rat(), b.Rat())
}
