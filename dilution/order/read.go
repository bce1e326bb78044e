package order

import (
	"fmt"
	"time"

	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/dilution/tomlfile"
)

// Read reads data, the text of the order file called name, and gives every
// reason to refuse it at once, in the order of the file: what [tomlfile.Decode]
// refuses, then too-many-syringes (alone with the faults of session and site;
// no patient is read), key-missing, keys-contradict, key-repeated, nothing-to-make,
// value-unknown, product-number-wrong, time-malformed, the faults of a quantity's text
// ([quantity.Fault]), units-against-mass, weight-missing, height-missing,
// sex-missing, weight-implausible, height-implausible, body-values-do-not-fit,
// text-too-long, text-misread. Cautions are weight-implausible, of a child's
// weight that few have, and text-misread.
//
// A reason that concerns one syringe carries its number. When nothing refuses,
// every given field of the order has a value.
func Read(name string, data []byte) (Order, refusal.List) {
	var file fileRecord
	places, list := tomlfile.Decode(name, data, &file, knownKeys()...)
	r := &reader{places: places, list: list, broken: map[int]bool{}, ids: map[string]bool{}, zone: time.UTC}
	r.order.File = name
	if !places.Whole() {
		return r.order, list // what is missing may stand in the part not read
	}
	for _, reason := range list {
		r.broken[reason.Pos.Line] = true
	}
	r.session(file.Session)
	r.site(file.Site)
	if !r.many(file.Patients) {
		for i, p := range file.Patients {
			r.patient(i, p)
		}
		r.something()
	}
	r.hold()
	r.attribute(len(list))
	r.list.Sort()
	return r.order, r.list
}

// reader reads one order.
type reader struct {
	places *tomlfile.Places
	list   refusal.List
	broken map[int]bool    // lines that have a reason of the file's form already
	ids    map[string]bool // of the patients read so far
	zone   *time.Location
	number int    // the syringe that is being read, 0 outside
	drug   string // its drug, for messages
	order  Order

	wordings []wording // texts in a person's own words
}

// at is a longer path; base is never changed.
func at(base []any, more ...any) []any {
	return append(append(make([]any, 0, len(base)+len(more)), base...), more...)
}

// refuse adds a refusal at path. Its field, if none is given, is the key in the
// user's words.
func (r *reader) refuse(path []any, reason refusal.Reason) {
	reason.Severity = refusal.Refuse
	r.add(path, reason)
}

// caution adds a caution at path, as refuse does.
func (r *reader) caution(path []any, reason refusal.Reason) {
	reason.Severity = refusal.Caution
	r.add(path, reason)
}

func (r *reader) add(path []any, reason refusal.Reason) {
	reason.Syringe = r.number
	reason.Pos = r.places.Of(path...)
	if reason.Field == "" {
		reason.Field = words(path)
	}
	r.list = append(r.list, reason)
}

// words is a path as people name it, without numbers: "patient.syringe.dose".
func words(path []any) string {
	s := ""
	for _, part := range path {
		if name, ok := part.(string); ok {
			if s != "" {
				s += "."
			}
			s += name
		}
	}
	return s
}

// key is the last name of a path.
func key(path []any) string {
	for i := len(path) - 1; i >= 0; i-- {
		if name, ok := path[i].(string); ok {
			return name
		}
	}
	return ""
}

// read turns a text into a value. A key that is not there gives an empty
// field; an empty text is refused, because it may be a form half filled in.
func read[T any](r *reader, text string, parse func(string) (T, error), path []any) Field[T] {
	f := Field[T]{Text: text, Pos: r.places.Of(path...)}
	if !r.places.Has(path...) || r.broken[f.Pos.Line] {
		return Field[T]{Pos: f.Pos}
	}
	value, err := parse(text)
	if err != nil {
		r.refuse(path, textReason(key(path), text, err))
		return f
	}
	f.Value = value
	return f
}

// mostSyringes of one order: its serial numbers have three digits for them.
const mostSyringes = 999

// many refuses an order with more syringes than can be told apart, at the first
// one too many in the order of making.
func (r *reader) many(patients []patientRecord) bool {
	var at []any
	count := 0
	for i, p := range patients {
		for _, list := range []struct {
			key string
			n   int
		}{{"syringe", len(p.Syringes)}, {"infusion", len(p.Infusions)}} {
			if count <= mostSyringes && count+list.n > mostSyringes {
				at = []any{"patient", i, list.key, mostSyringes - count}
			}
			count += list.n
		}
	}
	if count <= mostSyringes {
		return false
	}
	r.refuse(at, refusal.Reason{Code: refusal.SyringesMany, Got: fmt.Sprintf("%d syringes", count), Want: fmt.Sprintf("at most %d syringes and infusions", mostSyringes),
		Message: fmt.Sprintf("the order has %d syringes, and the serial numbers of one order have three digits for them", count), Remedy: "cut the order into several files"})
	return true
}

// something refuses an order that asks for nothing.
func (r *reader) something() {
	if len(r.order.Syringes) > 0 {
		return
	}
	for i := range r.order.Patients {
		if r.places.Has("patient", i, "syringe") || r.places.Has("patient", i, "infusion") {
			return // there is one, and its form is refused
		}
	}
	if len(r.order.Patients) == 0 && r.places.Has("patient") {
		return
	}
	want, remedy := "at least one [[patient]] with a [[patient.syringe]] or [[patient.infusion]]", "add the syringes that are wanted"
	message := "the order has no patient"
	if len(r.order.Patients) > 0 {
		message = "the order has patients, and no syringe or infusion for any of them"
	}
	r.refuse([]any{"patient"}, refusal.Reason{Code: refusal.NothingToMake, Message: message, Got: "nothing to make", Want: want, Remedy: remedy})
}

// attribute gives the first n reasons, those of the file's form, the number of
// the syringe in whose table they stand, so that the syringe can be left out.
func (r *reader) attribute(n int) {
	type start struct {
		pos    refusal.Pos
		number int
	}
	var starts []start
	for _, s := range r.order.Syringes {
		starts = append(starts, start{s.Pos, s.Number})
	}
	for _, p := range r.order.Patients {
		starts = append(starts, start{p.Pos, 0})
	}
	for _, table := range []string{"session", "site"} {
		if r.places.Has(table) {
			starts = append(starts, start{r.places.Of(table), 0})
		}
	}
	for i := range r.list[:n] {
		best := refusal.Pos{}
		for _, s := range starts {
			if !after(s.pos, r.list[i].Pos) && !after(best, s.pos) {
				best, r.list[i].Syringe = s.pos, s.number
			}
		}
	}
}

func after(a, b refusal.Pos) bool {
	return a.Line > b.Line || a.Line == b.Line && a.Column > b.Column
}

// site reads the house's settings; all of them may be left out.
func (r *reader) site(s siteRecord) {
	p := []any{"site"}
	r.order.Site = Site{
		Style:         read(r, s.Style, parseStyle, at(p, "style")),
		BolusUseBy:    read(r, s.BolusUseBy, parseSpan, at(p, "bolus_use_by")),
		InfusionUseBy: read(r, s.InfusionUseBy, parseSpan, at(p, "infusion_use_by")),
		Smallest:      read(r, s.Smallest, quantity.ParseVolume, at(p, "smallest_volume")),
		Tolerance:     read(r, s.Tolerance, quantity.ParsePercent, at(p, "tolerance")),
		PumpStep:      read(r, s.PumpStep, quantity.ParseFlowRate, at(p, "pump_step")),
	}
	site := &r.order.Site
	site.Edition = read(r, s.Edition, parseEdition, at(p, "edition"))
	site.Anticoagulants = read(r, s.Anticoagulants, parseAnticoagulants, at(p, "anticoagulants"))
	site.Jurisdiction = r.text(s.Jurisdiction, at(p, "jurisdiction"))
	site.TallMan = r.text(s.TallMan, at(p, "tall_man"))
	site.DualNames = s.DualNames
	for i, text := range s.Barrels {
		r.order.Site.Barrels = append(r.order.Site.Barrels, read(r, text, quantity.ParseVolume, at(p, "barrels", i)))
	}
	for i, product := range s.Products {
		r.product(product, at(p, "gtin", i))
	}
}
