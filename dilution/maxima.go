package dilution

import (
	"fmt"
	"time"

	"drawup/dilution/body"
	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// amountOf is a dose of the formulary for this patient.
func (w *work) amountOf(d quantity.Dose, by body.Kind) (quantity.Amount, error) {
	weight, surface, _, err := w.scalar(d.Basis(), by)
	if err != nil {
		return quantity.Amount{}, err
	}
	return absolute(d, weight, surface)
}

// courseMaxima holds one dose against the highest first dose, the highest
// repeat, and what all doses of a day or a course may come to. An order does
// not say whether its dose is the first: above the one figure it is a caution,
// above both it is refused.
func (w *work) courseMaxima(row formulary.Rule[quantity.Dose], d *DosePart, v *verdict) error {
	first, err := w.over(d.Amount, row.FirstMax, row.By)
	if err != nil {
		return err
	}
	repeat, err := w.over(d.Amount, row.RepeatMax, row.By)
	if err != nil {
		return err
	}
	switch {
	case first && (repeat || !row.RepeatMax.Given()):
		rank := 1
		if repeat {
			rank = 3
		}
		v.say(rank, w.aboveMaximum(refusal.DoseAboveFirst, d, row, row.FirstMax, "the highest first dose"))
	case first:
		v.say(1, w.aboveMaximum(refusal.DoseAboveFirst, d, row, row.FirstMax, "the highest first dose: right as a repeat only"))
	case repeat:
		v.say(1, w.aboveMaximum(refusal.DoseAboveFirst, d, row, row.RepeatMax, "the highest repeat: right as a first dose only"))
	}
	for _, m := range []struct {
		f    formulary.Figure[quantity.Dose]
		what string
	}{{row.DayMax, "what all doses of a day may come to"}, {row.CourseMax, "what all doses may come to"}} {
		over, err := w.over(d.Amount, m.f, row.By)
		if err != nil {
			return err
		}
		if over {
			v.say(3, w.aboveMaximum(refusal.DoseAboveDay, d, row, m.f, m.what))
		}
	}
	return nil
}

// over reports whether an amount passes a figure of the formulary.
func (w *work) over(a quantity.Amount, f formulary.Figure[quantity.Dose], by body.Kind) (bool, error) {
	if !f.Given() {
		return false, nil
	}
	most, err := w.amountOf(f.Value, by)
	if err != nil {
		return false, err
	}
	n, err := a.Cmp(most)
	return n > 0, err
}

func (w *work) aboveMaximum(
	code refusal.Code, d *DosePart, row formulary.Rule[quantity.Dose], f formulary.Figure[quantity.Dose], what string,
) refusal.Reason {
	s := w.plan.Style
	r := refusal.Reason{
		Code: code, Field: "dose",
		Got: s.Amount(d.Amount), Want: "at most " + s.Dose(f.Value),
		Rule: "R10", Source: sourceWords(f.Source, f.Unverified), Pos: w.o.Dose.Pos,
		Message: fmt.Sprintf("the dose of %s is more than %s, %s (%s)", s.Amount(d.Amount), s.Dose(f.Value), what, row.For),
		Remedy:  "check the dose, and what the patient has had before",
	}
	if code == refusal.DoseAboveDay {
		r.Rule = "R11"
	}
	return r
}

// holdsTooMuch cautions when one syringe holds more than all doses of a day or
// a course may come to.
func (w *work) holdsTooMuch() bool {
	var rows []formulary.Figure[quantity.Dose]
	by := body.None
	if d := w.plan.Dose; d != nil {
		rows, by = append(rows, d.Rule.DayMax, d.Rule.CourseMax), d.Rule.By
		w.holdsMoreThanOneDose(d.Rule)
	}
	if part := w.plan.Infusion; part != nil {
		rows, by = append(rows, part.Rule.CourseMax), part.Rule.By
	}
	for _, f := range rows {
		over, err := w.over(w.plan.Mixture.Amount, f, by)
		if err != nil {
			return w.sizeFault(err, "amount", w.o.Pos)
		}
		if over {
			s := w.plan.Style
			w.caution(refusal.Reason{
				Code: refusal.AmountAboveCourse, Field: "amount",
				Got: s.Amount(w.plan.Mixture.Amount), Want: "at most " + s.Dose(f.Value),
				Rule: "R10", Source: sourceWords(f.Source, f.Unverified), Pos: w.o.Pos,
				Message: fmt.Sprintf("the syringe holds %s, more than the %s that may be given", s.Amount(w.plan.Mixture.Amount), s.Dose(f.Value)),
				Remedy:  "make less, or count what has been given",
			})
			break
		}
	}
	return w.longest()
}

// holdsMoreThanOneDose cautions when the syringe holds more than the absolute
// maximum of one dose, so that nobody gives it whole.
func (w *work) holdsMoreThanOneDose(row formulary.Rule[quantity.Dose]) {
	f, s, held := row.TotalMax, w.plan.Style, w.plan.Mixture.Amount
	if n, err := held.Cmp(f.Value); !f.Given() || err != nil || n <= 0 {
		return
	}
	w.caution(refusal.Reason{
		Code: refusal.AmountAboveCourse, Field: "amount",
		Got: s.Amount(held), Want: "at most " + s.Amount(f.Value),
		Rule: "R11", Source: sourceWords(f.Source, f.Unverified), Pos: w.o.Pos,
		Message: fmt.Sprintf("the syringe holds %s, more than the absolute maximum, %s", s.Amount(held), s.Amount(f.Value)),
		Remedy:  "never give the whole syringe, or make less",
	})
}

// longest cautions when the syringe at its start rate runs for longer than the
// formulary allows.
func (w *work) longest() bool {
	part := w.plan.Infusion
	if part == nil || !part.Rule.Longest.Given() {
		return true
	}
	f := part.Rule.Longest
	most := int64(f.Value / time.Minute)
	if part.Minutes <= most {
		return true
	}
	return w.caution(refusal.Reason{
		Code: refusal.RunsTooLong, Field: "start",
		Got: hours(part.Minutes), Want: "at most " + hours(most),
		Rule: "R10", Source: sourceWords(f.Source, f.Unverified), Pos: w.o.Start.Pos,
		Message: fmt.Sprintf("at the start rate it runs for %s; %s is the longest that %s may run (%s)",
			hours(part.Minutes), hours(most), w.plan.Drug.Name, part.Rule.For),
		Remedy: "stop it in time, empty or not",
	})
}

// hours is a time in whole hours, down, or in minutes below two hours.
func hours(minutes int64) string {
	if minutes < 120 {
		return fmt.Sprintf("%d min", minutes)
	}
	return fmt.Sprintf("%d h", minutes/60)
}
