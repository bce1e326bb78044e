package order

import (
	"fmt"
	"time"

	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/dilution/tomlfile"
)

// A Shelf is what a place has to make syringes from: one shelf file.
type Shelf struct {
	File     string
	Name     Field[string] // of the place
	Invented bool          // demonstration data
	// NeedleDeadSpace is what stays in the needle that draws; not given: not
	// counted.
	NeedleDeadSpace Field[quantity.Volume]
	Stock           []Stocked
	Barrels         []StockedBarrel
	Fluids          []StockedFluid // diluents; none: every listed diluent is at hand
	Pumps           []StockedPump  // none: every pump takes 20 mL and more
	Pos             refusal.Pos
}

// A Stocked is one presentation on the shelf.
type Stocked struct {
	Drug, Presentation Field[string]
	Count              Field[int] // how many there are; not given: as many as are needed
	Pos                refusal.Pos
}

// A StockedBarrel is one size of syringe on the shelf.
type StockedBarrel struct {
	Size      Field[quantity.Volume]
	Step      Field[quantity.Volume] // graduation; not given: the one on record for the size
	DeadSpace Field[quantity.Volume] // what stays in it when it is empty; not given: not counted
	Pos       refusal.Pos
}

// A StockedFluid is one container of a diluent on the shelf.
type StockedFluid struct {
	Name      Field[string]
	Container Field[string] // one of Containers
	Volume    Field[quantity.Volume]
	Count     Field[int]
	Pos       refusal.Pos
}

// A StockedPump is one pump and the sizes of syringe that it takes.
type StockedPump struct {
	Name  Field[string]
	Takes []Field[quantity.Volume]
	Pos   refusal.Pos
}

// mostCount bounds how many of one thing a shelf may have: our own bound, against
// slips of the pen.
const mostCount = 100000

// ReadShelf reads data, the text of the shelf file called name, and gives every
// reason to refuse it at once, in the order of the file: what [tomlfile.Decode]
// refuses, then key-missing, value-unknown, the faults of a quantity's text, and
// shelf-empty and no-barrel-stocked for a shelf without any. Whether the
// formulary knows what it names is the planner's question.
func ReadShelf(name string, data []byte) (Shelf, refusal.List) {
	var file shelfFile
	places, list := tomlfile.Decode(name, data, &file, shelfKeys()...)
	r := &reader{places: places, list: list, broken: map[int]bool{}, ids: map[string]bool{}, zone: time.UTC}
	out := Shelf{File: name, Pos: refusal.Pos{File: name}}
	if !places.Whole() {
		return out, list
	}
	for _, reason := range list {
		r.broken[reason.Pos.Line] = true
	}
	top := []any{"shelf"}
	out.Name = r.text(file.Shelf.Name, at(top, "name"))
	out.Invented = file.Shelf.Invented
	out.NeedleDeadSpace = read(r, file.Shelf.Needle, quantity.ParseVolume, at(top, "needle_dead_space"))
	for i, s := range file.Stock {
		out.Stock = append(out.Stock, r.stocked(s, []any{"stock", i}))
	}
	for i, b := range file.Barrels {
		out.Barrels = append(out.Barrels, r.barrel(b, []any{"barrel", i}))
	}
	for i, d := range file.Fluids {
		out.Fluids = append(out.Fluids, r.fluid(d, []any{"diluent", i}))
	}
	for i, p := range file.Pumps {
		out.Pumps = append(out.Pumps, r.pump(p, []any{"pump", i}))
	}
	r.bare(out)
	r.list.Sort()
	return out, r.list
}

// bare refuses a shelf on which nothing stands, or no syringe. Where a table is
// there and its form is refused, that reason stands alone.
func (r *reader) bare(s Shelf) {
	if len(s.Stock) == 0 && !r.places.Has("stock") {
		r.refuse([]any{"stock"}, refusal.Reason{Code: refusal.ShelfEmpty, Got: "no [[stock]]", Want: "at least one ampoule or vial", Rule: "R10",
			Message: "the shelf lists no ampoule or vial, so that nothing can be made from it",
			Remedy:  "list what there is, each as a [[stock]] with drug and presentation, or prepare the order without a shelf"})
	}
	if len(s.Barrels) == 0 && !r.places.Has("barrel") {
		r.refuse([]any{"barrel"}, refusal.Reason{Code: refusal.BarrelNone, Got: "no [[barrel]]", Want: "at least one size of syringe", Rule: "R8",
			Message: "the shelf lists no syringe, so that nothing on it can be measured",
			Remedy:  `list the sizes that there are, each as a [[barrel]] with a line such as: size = "10 mL"`})
	}
}

func (r *reader) stocked(s stockRecord, path []any) Stocked {
	out := Stocked{
		Drug: r.text(s.Drug, at(path, "drug")), Presentation: r.text(s.Presentation, at(path, "presentation")),
		Count: r.howMany(s.Count, at(path, "count")), Pos: r.places.Of(path...),
	}
	r.required(out.Drug.Given(), path, "drug", "a [[stock]]", `drug = "ephedrine"`)
	r.required(out.Presentation.Given(), path, "presentation", "a [[stock]]", `presentation = "ampoule 30 mg in 1 mL"`)
	return out
}

func (r *reader) barrel(b barrelRecord, path []any) StockedBarrel {
	out := StockedBarrel{
		Size:      read(r, b.Size, quantity.ParseVolume, at(path, "size")),
		Step:      read(r, b.Step, quantity.ParseVolume, at(path, "step")),
		DeadSpace: read(r, b.DeadSpace, quantity.ParseVolume, at(path, "dead_space")),
		Pos:       r.places.Of(path...),
	}
	r.required(r.places.Has(at(path, "size")...), path, "size", "a [[barrel]]", `size = "10 mL"`)
	return out
}

// Containers are what a diluent on the shelf may come in.
func Containers() []string { return []string{"ampoule", "vial", "bag", "bottle", "syringe"} }

func (r *reader) fluid(d fluidRecord, path []any) StockedFluid {
	out := StockedFluid{
		Name: r.text(d.Name, at(path, "name")), Container: r.text(d.Container, at(path, "container")),
		Volume: read(r, d.Volume, quantity.ParseVolume, at(path, "volume")),
		Count:  r.howMany(d.Count, at(path, "count")), Pos: r.places.Of(path...),
	}
	r.required(out.Name.Given(), path, "name", "a [[diluent]]", `name = "sodium chloride 0.9 %"`)
	r.required(r.places.Has(at(path, "volume")...), path, "volume", "a [[diluent]]", `volume = "10 mL"`)
	r.required(out.Container.Given(), path, "container", "a [[diluent]]", `container = "ampoule"`)
	if known := Containers(); out.Container.Given() && !within(known, out.Container.Value) {
		r.refuse(at(path, "container"), refusal.Reason{Code: refusal.ValueUnknown, Got: out.Container.Text, Want: either(known),
			Message: fmt.Sprintf("a diluent comes in no %q here", out.Container.Value), Remedy: "write " + either(known)})
	}
	return out
}

func (r *reader) pump(p pumpRecord, path []any) StockedPump {
	out := StockedPump{Name: r.text(p.Name, at(path, "name")), Pos: r.places.Of(path...)}
	for i, text := range p.Takes {
		out.Takes = append(out.Takes, read(r, text, quantity.ParseVolume, at(path, "takes", i)))
	}
	r.required(out.Name.Given(), path, "name", "a [[pump]]", `name = "pump on the trolley"`)
	r.required(r.places.Has(at(path, "takes")...), path, "takes", "a [[pump]]", `takes = ["20 mL", "50 mL"]`)
	if len(p.Takes) == 0 && r.places.Has(at(path, "takes")...) && !r.unread(at(path, "takes")) {
		r.refuse(at(path, "takes"), refusal.Reason{Code: refusal.KeyMissing, Got: "an empty list", Want: `sizes such as takes = ["20 mL", "50 mL"]`,
			Message: "a pump that takes no syringe is of no use", Remedy: "list the sizes that it takes, or take the pump out"})
	}
	return out
}

// howMany reads how many of a thing there are; none is as good as not listed,
// and is refused, so that nobody takes it for "as many as are needed".
func (r *reader) howMany(v any, path []any) Field[int] {
	return r.whole(v, path, mostCount, "a whole number from 1 such as: count = 10", "none of it is there: take the whole entry out")
}

func within(list []string, word string) bool {
	for _, s := range list {
		if s == word {
			return true
		}
	}
	return false
}

// either is a list of words in quotes with "or" before the last.
func either(list []string) string {
	text := ""
	for i, s := range list {
		switch {
		case i == 0:
		case i == len(list)-1:
			text += " or "
		default:
			text += ", "
		}
		text += fmt.Sprintf("%q", s)
	}
	return text
}
