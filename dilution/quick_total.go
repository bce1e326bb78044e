package dilution

import (
	"fmt"
	"math/big"
	"time"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// A QuickRun is how long a dose rate runs, and the dose that goes before it.
type QuickRun struct {
	Time  quantity.Duration
	First quantity.Dose // not given: none
}

// run holds what a dose rate comes to against the maxima of a day and of a
// course, and its time against the longest (rules R10, R11). The maxima of a day
// stand in the rows of single doses.
func (w *work) run(row formulary.Rule[quantity.DoseRate], rate quantity.DoseRate, q QuickRun) bool {
	whole, err := w.comesTo(row, rate, q)
	if err != nil {
		return w.sizeFault(err, "total", refusal.Pos{})
	}
	ok := w.notOver(whole, row.CourseMax, row.For, "what all of it may come to", func(f formulary.Figure[quantity.Dose]) (quantity.Amount, error) {
		return w.amountOf(f.Value, row.By)
	})
	day := q
	if most := quantity.Minutes(big.NewRat(1440, 1)); q.Time.Rat().Cmp(most.Rat()) > 0 {
		day.Time = most
	}
	inDay, err := w.comesTo(row, rate, day)
	if err != nil {
		return w.sizeFault(err, "total", refusal.Pos{})
	}
	for _, d := range w.plan.Drug.Doses {
		if !routeListed(d.Routes, w.plan.Route) || !d.Fits(w.size.Age) || w.o.Indication.Given() && d.For != w.o.Indication.Value {
			continue
		}
		ok = w.notOver(inDay, d.DayMax, d.For, "what a day may come to", func(f formulary.Figure[quantity.Dose]) (quantity.Amount, error) {
			return w.amountOf(f.Value, d.By)
		}) && ok
	}
	w.notTooLong(row, q)
	return ok
}

// comesTo is the first dose and the rate over its time, for this patient.
func (w *work) comesTo(row formulary.Rule[quantity.DoseRate], rate quantity.DoseRate, q QuickRun) (quantity.Amount, error) {
	dose, err := rate.During(q.Time)
	if err != nil {
		return quantity.Amount{}, err
	}
	amount, err := w.amountOf(dose, row.By)
	if err != nil || !q.First.Given() {
		return amount, err
	}
	first, err := w.amountOf(q.First, row.By)
	if err != nil {
		return amount, err
	}
	return first.Plus(amount)
}

// notOver refuses an amount above a maximum, where one is stored.
func (w *work) notOver(
	a quantity.Amount, f formulary.Figure[quantity.Dose], purpose, what string,
	of func(formulary.Figure[quantity.Dose]) (quantity.Amount, error),
) bool {
	if !f.Given() {
		return true
	}
	most, err := of(f)
	if err != nil {
		return w.sizeFault(err, "total", refusal.Pos{})
	}
	n, err := a.Cmp(most)
	if err != nil {
		return w.fault(err, "total", refusal.Pos{})
	}
	if n <= 0 {
		return true
	}
	s := w.plan.Style
	return w.refuse(refusal.Reason{
		Code: refusal.DoseAboveDay, Field: "total", Got: s.Amount(a), Want: "at most " + s.Dose(f.Value), Rule: "R11",
		Source:  sourceWords(f.Source, f.Unverified),
		Message: fmt.Sprintf("%s in all are more than %s, %s (%s)", s.Amount(a), s.Dose(f.Value), what, purpose),
		Remedy:  "run it slower or for less time; no setting passes this limit",
	})
}

// notTooLong cautions when the time is longer than the formulary allows.
func (w *work) notTooLong(row formulary.Rule[quantity.DoseRate], q QuickRun) {
	f := row.Longest
	if !f.Given() || q.Time.Rat().Cmp(big.NewRat(int64(f.Value/time.Minute), 1)) <= 0 {
		return
	}
	w.caution(refusal.Reason{
		Code: refusal.RunsTooLong, Field: "time", Got: w.plan.Style.Duration(q.Time), Want: "at most " + hours(int64(f.Value/time.Minute)),
		Rule: "R10", Source: sourceWords(f.Source, f.Unverified),
		Message: fmt.Sprintf("%s is longer than %s may run, %s (%s)", w.plan.Style.Duration(q.Time), w.plan.Drug.Name,
			hours(int64(f.Value/time.Minute)), row.For),
		Remedy: "stop it in time",
	})
}
