package dilution

import (
	"fmt"
	"math/big"
	"strings"

	"drawup/dilution/body"
	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// localSums adds up the local anaesthetics of each patient. Each syringe is
// its amount over its drug's maximum for this patient; together they must not
// pass one (rule R11). An infusion counts against the maximum of a day, and
// where none is stored it is left out and a caution says so. A syringe with an ordered dose counts with that dose,
// any other with all it holds.
func localSums(works []*work) refusal.List {
	var out refusal.List
	byPatient := map[int][]*work{}
	var patients []int
	for _, w := range works {
		if len(w.plan.Drug.LocalMaxima) == 0 || !w.plan.Mixture.Amount.Given() {
			continue
		}
		if _, seen := byPatient[w.o.Patient]; !seen {
			patients = append(patients, w.o.Patient)
		}
		byPatient[w.o.Patient] = append(byPatient[w.o.Patient], w)
	}
	for _, p := range patients {
		out = append(out, localSum(byPatient[p])...)
	}
	return out
}

// localSum adds up the syringes of one patient.
func localSum(works []*work) refusal.List {
	sum := new(big.Rat)
	var parts []string
	for _, w := range works {
		share, words, reason := w.localShare()
		if reason != nil && (len(works) == 1 || w.o.Infusion) {
			continue // said by localKnown
		}
		if reason != nil {
			return refusal.List{*reason}
		}
		sum.Add(sum, share)
		parts = append(parts, fmt.Sprintf("syringe %d: %s", w.o.Number, words))
	}
	if sum.Cmp(one()) <= 0 {
		return nil
	}
	w := works[len(works)-1]
	percent := new(big.Rat).Mul(sum, big.NewRat(100, 1))
	return refusal.List{{
		Code: refusal.LocalSum, Severity: refusal.Refuse, Syringe: w.o.Number,
		Field: "syringe", Got: percentOf(w.plan.Style, percent) + " of the maximum", Want: "at most 100 %",
		Rule: "R11", Source: localSources(works), Pos: w.o.Pos,
		Message: fmt.Sprintf("the local anaesthetics of one patient add up to %s of their maxima: %s",
			percentOf(w.plan.Style, percent), strings.Join(parts, "; ")),
		Remedy: "order less, or give part of it later, as local policy says; no setting passes this limit",
	}}
}

// localKnown cautions when a syringe of a local anaesthetic cannot be held
// against a maximum.
func (w *work) localKnown() bool {
	if len(w.plan.Drug.LocalMaxima) == 0 {
		return true
	}
	if _, _, reason := w.localShare(); reason != nil {
		return w.caution(*reason)
	}
	return true
}

// localShare is what the syringe takes of its drug's maximum, and how.
func (w *work) localShare() (*big.Rat, string, *refusal.Reason) {
	s := w.plan.Style
	given := w.plan.Mixture.Amount
	if w.plan.Dose != nil {
		given = w.plan.Dose.Amount
	}
	most, err := w.localMost(w.o.Infusion)
	if err != nil {
		return nil, "", w.localUnknown(err.Error())
	}
	if !most.Given() {
		return nil, "", w.localUnknown("the formulary stores no maximum for this patient")
	}
	share, err := given.Share(most)
	if err != nil {
		return nil, "", w.localUnknown(err.Error())
	}
	return share, fmt.Sprintf("%s of %s, at most %s", s.Amount(given), w.plan.Drug.Name, s.Amount(most)), nil
}

// localMost is the lowest maximum that fits the patient, as an amount: of one
// time, or for an infusion, which runs for hours, of a day.
func (w *work) localMost(day bool) (quantity.Amount, error) {
	m, err := w.localMaximum(day, func(formulary.LocalMaximum) bool { return true })
	return m.amount, err
}

// A localFigure is a maximum for one patient, and the figure behind it.
type localFigure struct {
	amount        quantity.Amount
	words, source string
	by            body.Kind // the weight that the figure goes by
}

// localMaximum is the lowest maximum of the rows that fit the patient and are
// kept: of one time, or of a day. It is not given where none is stored.
func (w *work) localMaximum(day bool, kept func(formulary.LocalMaximum) bool) (localFigure, error) {
	var most localFigure
	take := func(x localFigure) error {
		if !most.amount.Given() {
			most = x
			return nil
		}
		n, err := x.amount.Cmp(most.amount)
		if err == nil && n < 0 {
			most = x
		}
		return err
	}
	s := w.plan.Style
	for _, m := range w.plan.Drug.LocalMaxima {
		if !m.Fits(w.size.Age) || !kept(m) {
			continue
		}
		f := m.PerKg
		if day {
			f = m.DayMax
		}
		if f.Given() {
			a, err := w.amountOf(f.Value, m.By)
			if err == nil {
				err = take(localFigure{a, s.Dose(f.Value), sourceWords(f.Source, f.Unverified), m.By})
			}
			if err != nil {
				return most, err
			}
		}
		if f := m.Total; f.Given() && !day {
			if err := take(localFigure{f.Value, s.Amount(f.Value), sourceWords(f.Source, f.Unverified), m.By}); err != nil {
				return most, err
			}
		}
	}
	return most, nil
}

func (w *work) localUnknown(why string) *refusal.Reason {
	return &refusal.Reason{
		Code: refusal.LocalSum, Severity: refusal.Refuse, Syringe: w.o.Number,
		Field: "syringe", Want: "a maximum of each local anaesthetic of the patient", Rule: "R11", Pos: w.o.Pos,
		Message: fmt.Sprintf("the local anaesthetics of the patient cannot be added up: %s (%s)", why, w.plan.Drug.Name),
		Remedy:  "write the patient's age and weight, or add the maximum with its source to the formulary (whoever keeps it does that)",
	}
}

// localSources are the documents that the maxima come from.
func localSources(works []*work) string {
	var out []string
	add := func(s formulary.Source, unverified, given bool) {
		if text := sourceWords(s, unverified); given && !routeListed(out, text) {
			out = append(out, text)
		}
	}
	for _, w := range works {
		for _, m := range w.plan.Drug.LocalMaxima {
			if m.Fits(w.size.Age) {
				add(m.PerKg.Source, m.PerKg.Unverified, m.PerKg.Given())
				add(m.Total.Source, m.Total.Unverified, m.Total.Given())
				add(m.DayMax.Source, m.DayMax.Unverified, m.DayMax.Given() && w.o.Infusion)
			}
		}
	}
	return strings.Join(out, "; ")
}
