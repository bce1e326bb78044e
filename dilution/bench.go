package dilution

import (
	"time"

	"drawup/dilution/formulary"
	"drawup/dilution/order"
	"drawup/dilution/refusal"
)

// A Bench is what the planner works from besides the order: the shelf, if the
// place has written down what is on it. Without one the planner takes any
// presentation that the order names, or the only one that is listed, and the
// usual syringes.
type Bench struct {
	// Shelf is nil where nobody has written one down.
	Shelf *order.Shelf
	// Explain keeps every alternative that was weighed, and why it lost.
	Explain bool
}

// NewList plans every syringe of o that is not left out, from whatever there is.
// It returns all reasons; when any of them refuses, nothing of the list is to be
// made.
func NewList(
	o order.Order,
	f *formulary.Formulary,
	at time.Time,
	leaveOut map[int]bool,
	faults refusal.List,
) (List, refusal.List) {
	return Bench{}.NewList(o, f, at, leaveOut, faults)
}

// NewList plans every syringe of o that is not left out, from the bench. Syringes
// are planned in making order, and what one of them opens, made or left out, is
// gone from the shelf for the next, so that a label printed by itself comes from
// the same containers as in the list. It returns all reasons; when any of them refuses, nothing of the
// list is to be made.
func (b Bench) NewList(
	o order.Order,
	f *formulary.Formulary,
	at time.Time,
	leaveOut map[int]bool,
	faults refusal.List,
) (List, refusal.List) {
	list := List{Order: o, Formulary: f, At: at}
	var all refusal.List
	for _, r := range faults {
		if r.Syringe == 0 || !leaveOut[r.Syringe] {
			all = append(all, r)
		}
	}
	s, stopped := b.site(o, f)
	all = append(all, stopped...)
	if stopped.Refused() {
		return list, all
	}
	tall, missing := tallManOf(f, o.Site.TallMan)
	s.tallMan = tall
	all = append(all, missing...)
	made := plannedAll(s, &list, &all, leaveOut, faults)
	all = append(all, localSums(made)...)
	whole := append(edition(s, o), shared(list.Plans)...)
	all = append(all, whole...)
	list.Cautions = append(ofOrder(faults), whole...)
	if len(list.Plans) == 0 && !all.Refused() {
		all = append(all, refusal.Reason{
			Code: refusal.NothingToMake, Severity: refusal.Refuse,
			Want:    "at least one syringe",
			Message: "every syringe of the order is left out",
			Remedy:  "leave fewer out",
		})
	}
	return list, all
}

// site is what holds for the whole order: its [site] table and the shelf.
func (b Bench) site(o order.Order, f *formulary.Formulary) (site, refusal.List) {
	s, err := siteOf(o)
	if err != nil {
		return s, refusal.List{{
			Code: refusal.ValueUnknown, Severity: refusal.Refuse,
			Field: "site", Rule: "R8",
			Pos:     o.Site.Tolerance.Pos,
			Message: err.Error(),
			Remedy:  "mend the [site] table of the order",
		}}
	}
	s.explain = b.Explain
	if b.Shelf == nil {
		return s, nil
	}
	stock, faults := stockOf(*b.Shelf, f)
	if faults.Refused() {
		return s, faults
	}
	return s, append(faults, s.takeShelf(stock, o)...)
}

// plannedAll plans the syringes in making order and sorts them into list and all.
func plannedAll(s site, list *List, all *refusal.List, leaveOut map[int]bool, faults refusal.List) []*work {
	o := list.Order
	broken := brokenSyringes(faults)
	var made []*work
	for _, sy := range o.Syringes {
		unread := broken[sy.Number] || unreadable(o.Patients[sy.Patient])
		w := newPlan(s, list.Formulary, o, sy, list.At, unread)
		p, reasons := w.plan, w.reasons
		if s.stock != nil && !unread && !reasons.Refused() {
			s.stock.takeAway(p) // also for one that is left out: it may be made another time
		}
		typed := append(ofPatient(faults, o, sy.Patient), faults.Cautions().Of(sy.Number)...)
		p.Cautions = append(typed, p.Cautions...)
		if unread && !leaveOut[sy.Number] {
			*all = append(*all, reasons.Refusals()...)
			continue
		}
		if leaveOut[sy.Number] {
			list.LeftOut = append(list.LeftOut,
				LeftOut{sy.Number, sy.Drug.Value, append(faults.Of(sy.Number), reasons.Refusals()...)})
			continue
		}
		*all = append(*all, reasons...)
		list.Plans = append(list.Plans, p)
		made = append(made, w)
	}
	return made
}
