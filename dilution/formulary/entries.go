package formulary

import (
	"fmt"
	"strings"
	"time"

	"drawup/dilution/body"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// An Entry is one thing that a record says of a drug, under a name that stays
// the same when only the figure changes, so that two formularies can be held
// against each other figure by figure.
type Entry struct {
	Name       string // "dose for induction, IV, from 18 years: hard maximum"
	Text       string // as the file has it
	Source     Source
	Unverified bool
	VerifiedBy string
	Reason     string // why it is looser than the base, if the file says so
	Pos        refusal.Pos

	looser direction
	value  any // a quantity, or nil where only the words count
}

// A direction says which change of an entry lets more through.
type direction int

const (
	neither  direction = iota
	upwards            // a higher figure, or none at all
	downward           // a lower figure, or none at all
	present            // being there at all: a diluent, a route, a pair
	absent             // not being there: a ban, a caution
	turned             // another word, whichever: what a figure is multiplied by
)

// entries gathers those of one drug.
type entries struct{ list []Entry }

func (e *entries) add(x Entry) { e.list = append(e.list, x) }

func add[T any](e *entries, name string, f Figure[T], looser direction) {
	if f.Given() {
		e.add(Entry{Name: name, Text: f.Text, Source: f.Source, Unverified: f.Unverified, VerifiedBy: f.VerifiedBy,
			Reason: f.Reason, Pos: f.Pos, looser: looser, value: f.Value})
	}
}

func (e *entries) note(name string, n *Note, looser direction) {
	if n != nil {
		e.add(Entry{Name: name, Text: n.Text, Source: n.Source, Unverified: n.Unverified, Pos: n.Pos, looser: looser})
	}
}

func (e *entries) word(name, text string, pos refusal.Pos, looser direction) {
	if text != "" {
		e.add(Entry{Name: name, Text: text, Pos: pos, looser: looser})
	}
}

// Entries is all that the record says of the drug, in the order of the record.
func (d Drug) Entries() []Entry {
	e := &entries{}
	e.word("ATC code", d.ATC, d.Pos, neither)
	e.word("label class", d.Class, d.Pos, neither)
	e.word("counted by", d.Kind.String()+" "+d.CountedAs, d.Pos, neither)
	e.word("formula", d.Formula, d.Pos, neither)
	for _, n := range d.allNames()[1:] {
		e.word("name "+n, n, d.Pos, neither)
	}
	for _, f := range d.Flags {
		e.word("flag "+f, "set", d.Pos, absent)
	}
	for i := range d.Cautions {
		e.note("caution: "+d.Cautions[i].Text, &d.Cautions[i], absent)
	}
	e.note("never as infusion", d.NeverAsInfusion, absent)
	e.note("never as bolus", d.NeverAsBolus, absent)
	add(e, "amount of substance", d.Substance, neither)
	if d.IonsPerFormula != 1 {
		e.word("ions per formula", fmt.Sprint(d.IonsPerFormula), d.Pos, neither)
	}
	if d.ShowAs {
		e.word("counted by, on the label", "shown", d.Pos, neither)
	}
	if d.Salt != nil {
		e.add(Entry{Name: "salt " + d.Salt.Name, Text: d.Salt.PerMg.Written(), Source: d.Salt.Source,
			Unverified: d.Salt.Unverified, Pos: d.Salt.Pos, value: d.Salt.PerMg})
	}
	for _, p := range d.Presentations {
		e.presentation(p)
	}
	for _, b := range d.Bounds {
		name := "concentration for " + b.Use + ", " + b.Line + " line" + tail(", ", strings.Join(b.Routes, ", ")) + tail(", ", b.Whom())
		add(e, name+": lowest", b.Low, downward)
		add(e, name+": highest", b.High, upwards)
	}
	for _, r := range d.Doses {
		row(e, "dose for ", r)
	}
	for _, r := range d.Rates {
		row(e, "dose rate for ", r)
	}
	for _, m := range d.LocalMaxima {
		e.localMaximum(m)
	}
	for _, s := range d.Standards {
		e.add(Entry{Name: "standard preparation " + s.ID + ", " + s.Line + " line, " + s.Jurisdiction,
			Text: strings.TrimSuffix(s.ID+", "+s.Diluent+", "+s.Patients, ", "), Source: s.Source, Unverified: s.Unverified,
			Pos: s.Pos, looser: present})
	}
	for _, s := range d.Stability {
		e.add(Entry{Name: s.Name(), Text: s.Text, Source: s.Source, Unverified: s.Unverified, Pos: s.Pos,
			looser: upwards, value: time.Duration(s.Minutes) * time.Minute})
	}
	return e.list
}

// Name is the preparation in words, as Entries names it.
func (s Stability) Name() string {
	return "stability, " + s.Diluent + ", " + s.Storage + tail(", ", s.Container) + tail(", from ", s.Low.Text) + tail(", up to ", s.High.Text)
}

// tail is text after its lead, "" when there is no text.
func tail(lead, text string) string {
	if text == "" {
		return ""
	}
	return lead + text
}

func (e *entries) presentation(p Presentation) {
	at := p.ID + ": "
	text := p.Amount.Written() + tail(" in ", p.Volume.Written())
	if p.Powder() {
		text = p.Amount.Written() + " of powder" + tail(", add ", p.Added.Written())
		if p.Obtained {
			text += ", which gives " + p.Volume.Written()
		}
	}
	if p.SecondName != "" {
		text += " with " + p.SecondAmount.Written() + " of " + p.SecondName
	}
	e.add(Entry{Name: at + "contents", Text: text, Source: p.Source, Unverified: p.Unverified, Pos: p.Pos, looser: present})
	add(e, at+"assay limits", p.Assay, neither)
	add(e, at+"displacement", p.Displacement, neither)
	add(e, at+"overfill", p.Overfill, neither)
	if p.AgeFrom.Given() {
		e.add(Entry{Name: at + "from age", Text: p.AgeFrom.String(), Pos: p.Pos, looser: downward, value: p.AgeFrom})
	}
	for _, u := range p.Uses {
		e.word(at+"use as "+u, "allowed", p.Pos, present)
	}
	if len(p.Routes) > 0 {
		e.word(at+"bound to routes", strings.Join(p.Routes, ", "), p.Pos, absent)
	}
	if p.Neat {
		e.word(at+"undiluted", "allowed", p.Pos, present)
	}
	if p.MultiDose {
		e.word(at+"more than one dose", "allowed", p.Pos, present)
	}
	for _, f := range p.AddFluids {
		e.word(at+"dissolved in "+f, "allowed", p.Pos, present)
	}
	e.note(at+"preserved", p.Preserved, absent)
	e.note(at+"not for a pump", p.NotForPump, absent)
	for _, d := range p.Diluents {
		name := at + "diluent " + d.Name
		e.add(Entry{Name: name, Text: "allowed", Source: d.Source, Unverified: d.Unverified, Pos: d.Pos, looser: present})
		add(e, name+": lowest concentration", d.Low, downward)
		add(e, name+": highest concentration", d.High, upwards)
	}
	for _, d := range p.Forbidden {
		e.add(Entry{Name: at + "forbidden diluent " + d.Name, Text: strings.TrimPrefix(d.Why+": "+d.Reason, ": "),
			Source: d.Source, Unverified: d.Unverified, Pos: d.Pos, looser: absent})
	}
	for i := range p.Notes {
		e.note(at+"note: "+p.Notes[i].Text, &p.Notes[i], absent)
	}
}

// row is one row of limits. Rows alike in all that names them are told apart
// by how their figures are counted.
func row[T interface{ Basis() quantity.Basis }](e *entries, what string, r Rule[T]) {
	name := what + r.For + ", " + strings.Join(r.Routes, " ") + tail(", ", r.Ages()) + countedTail(r)
	e.add(Entry{Name: name + ": goes by", Text: r.By.String(), Source: r.BySource, Pos: r.Pos, looser: turned})
	add(e, name+": hard minimum", r.HardLow, downward)
	add(e, name+": usual lowest", r.UsualLow, downward)
	add(e, name+": usual highest", r.UsualHigh, upwards)
	add(e, name+": soft maximum", r.SoftHigh, upwards)
	add(e, name+": hard maximum", r.HardHigh, upwards)
	add(e, name+": absolute maximum", r.TotalMax, upwards)
	add(e, name+": highest first dose", r.FirstMax, upwards)
	add(e, name+": highest repeat", r.RepeatMax, upwards)
	add(e, name+": shortest time to a repeat", r.RepeatAfter, downward)
	add(e, name+": maximum of a day", r.DayMax, upwards)
	add(e, name+": maximum of a course", r.CourseMax, upwards)
	add(e, name+": longest time", r.Longest, upwards)
}

func countedTail[T interface{ Basis() quantity.Basis }](r Rule[T]) string {
	for _, f := range []Figure[T]{r.UsualHigh, r.SoftHigh, r.HardHigh} {
		if !f.Given() {
			continue
		}
		switch f.Value.Basis() {
		case quantity.PerKilogram:
			return ", per kg"
		case quantity.PerSquareMetre:
			return ", per m2"
		case quantity.Absolute:
			return ""
		}
	}
	return ""
}

func (e *entries) localMaximum(m LocalMaximum) {
	name := "local anaesthetic maximum, without adrenaline"
	if m.WithAdrenaline {
		name = "local anaesthetic maximum, with adrenaline"
	}
	name += tail(", ", Rule[quantity.Dose]{AgeFrom: m.AgeFrom, AgeTo: m.AgeTo}.Ages())
	e.add(Entry{Name: name + ": goes by", Text: m.By.String(), Source: m.BySource, Pos: m.Pos, looser: turned})
	add(e, name+": by weight", m.PerKg, upwards)
	add(e, name+": in all", m.Total, upwards)
	add(e, name+": in a day", m.DayMax, upwards)
}

// PairEntries is what the formulary says of two drugs at once.
func (f *Formulary) PairEntries() []Entry {
	e := &entries{}
	for _, m := range f.Mixes {
		name := fmt.Sprintf("%s with %s in one syringe, %s, %s", m.Drugs[0], m.Drugs[1], m.Use, strings.Join(m.Routes, " "))
		e.add(Entry{Name: name, Text: "allowed", Source: m.Source, Unverified: m.Unverified, Pos: m.Pos, looser: present})
		add(e, name+": at most", m.Most, upwards)
		add(e, name+": life", m.Life, upwards)
		for _, b := range m.Bounds {
			add(e, name+": lowest of "+b.Drug, b.Low, downward)
			add(e, name+": highest of "+b.Drug, b.High, upwards)
		}
		for _, d := range m.Diluents {
			e.add(Entry{Name: name + ": diluent " + d.Name, Text: "allowed", Source: d.Source, Pos: d.Pos, looser: present})
		}
	}
	for _, n := range f.Never {
		e.add(Entry{Name: n.Drugs[0] + " never with " + n.Drugs[1], Text: n.Reason, Source: n.Source,
			Unverified: n.Unverified, Pos: n.Pos, looser: absent})
	}
	return e.list
}

// order compares the values of two entries of one name; ok is false when they
// cannot be compared, as when one is per kg and the other not.
func (x Entry) order(y Entry) (n int, ok bool) {
	var err error
	switch a := x.value.(type) {
	case quantity.Dose:
		b, is := y.value.(quantity.Dose)
		if !is || a.Basis() != b.Basis() {
			return 0, false
		}
		n, err = a.Cmp(b)
	case quantity.DoseRate:
		b, is := y.value.(quantity.DoseRate)
		if !is || a.Basis() != b.Basis() {
			return 0, false
		}
		n, err = a.Cmp(b)
	case quantity.Concentration:
		b, is := y.value.(quantity.Concentration)
		if !is {
			return 0, false
		}
		n, err = a.Cmp(b)
	case quantity.Amount:
		b, is := y.value.(quantity.Amount)
		if !is {
			return 0, false
		}
		n, err = a.Cmp(b)
	case quantity.Volume:
		b, is := y.value.(quantity.Volume)
		if !is {
			return 0, false
		}
		n = a.Cmp(b)
	case time.Duration:
		b, is := y.value.(time.Duration)
		if !is {
			return 0, false
		}
		n = int(max(-1, min(1, a-b)))
	case body.Age:
		b, is := y.value.(body.Age)
		if !is {
			return 0, false
		}
		n = ageOrder(a, b)
	case Proportion:
		b, is := y.value.(Proportion)
		if !is {
			return 0, false
		}
		return a.order(b)
	default:
		return 0, false // only the words count
	}
	return n, err == nil
}

func ageOrder(a, b body.Age) int {
	switch {
	case a.Less(b):
		return -1
	case b.Less(a):
		return 1
	}
	return 0
}

// order compares two proportions.
func (p Proportion) order(o Proportion) (int, bool) {
	a, err := p.Second.Share(p.First)
	if err != nil {
		return 0, false
	}
	b, err := o.Second.Share(o.First)
	if err != nil {
		return 0, false
	}
	return a.Cmp(b), true
}
