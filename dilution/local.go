package dilution

import (
	"fmt"
	"math/big"
	"strings"

	"drawup/dilution/body"
	"drawup/dilution/formulary"
	"drawup/dilution/order"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// Local anaesthetics add up: what each takes of its own maximum is a share, and
// the shares of all that is given, whatever the site, must not pass one. Common
// practice, no source; that toxicity adds up stands in US prescribing
// information of bupivacaine.

// A LocalGiven is one local anaesthetic that is given, or is to be given.
type LocalGiven struct {
	Drug          string
	Concentration quantity.Concentration
	Volume        quantity.Volume // not given: only the most is asked for
	MostPerKg     quantity.Dose   // a maximum that the user names; not given: the formulary's
	MostInAll     quantity.Amount
}

// A LocalSum is local anaesthetics to be added up for one patient.
type LocalSum struct {
	Given  []LocalGiven
	Weight quantity.BodyWeight
	Age    body.Age
	Route  string // where it goes: "infiltration", "nerve block"
	Style  quantity.Style
}

// A LocalShare is what one of them takes of its maximum.
type LocalShare struct {
	Drug       string
	Amount     quantity.Amount // nothing if no volume was given
	Most       quantity.Amount // for this patient
	Words      string          // the figure behind the most: "4.5 mg/kg" or "200 mg"
	Source     string          // where it comes from; "as typed" for the user's own
	By         body.Kind       // the weight that an order would go by; 0 for the user's own
	Typed      bool
	Share      *big.Rat        // amount / most
	MostVolume quantity.Volume // that holds the most, if nothing else is given
	LeftVolume quantity.Volume // that would still fit beside all that is given
}

// Work adds the shares up. The list refuses what is not on record, a maximum that
// the user sets above the stored one (rule R11), and shares above one in all.
func (l LocalSum) Work(f *formulary.Formulary) ([]LocalShare, *big.Rat, refusal.List) {
	var shares []LocalShare
	var reasons refusal.List
	total := new(big.Rat)
	for _, g := range l.Given {
		s, faults := l.share(g, f)
		reasons = append(reasons, faults...)
		if !faults.Refused() {
			shares = append(shares, s)
			total.Add(total, s.Share)
		}
	}
	if reasons.Refused() {
		return nil, nil, reasons
	}
	if total.Cmp(one()) > 0 {
		return shares, total, append(reasons, l.passed(total))
	}
	left := new(big.Rat).Sub(one(), total)
	for i := range shares {
		shares[i].LeftVolume = quantity.Millilitres(new(big.Rat).Mul(left, shares[i].MostVolume.Rat()))
	}
	return shares, total, reasons
}

// passed says that the shares make more than one.
func (l LocalSum) passed(total *big.Rat) refusal.Reason {
	per := l.Style.Percent(quantity.PerCent(new(big.Rat).Mul(total, big.NewRat(100, 1))))
	return refusal.Reason{
		Code: refusal.LocalMaxima, Severity: refusal.Refuse, Field: "local anaesthetics",
		Got: per, Want: "at most 100 %", Rule: "R11", Source: "common practice, no source; toxicity adds up: US prescribing information, bupivacaine",
		Message: "together they are " + per + " of the maximum: each takes its share of its own, and the shares add up",
		Remedy:  "give less, or weaker; no setting passes this limit",
	}
}

// share is one local anaesthetic against its maximum.
func (l LocalSum) share(g LocalGiven, f *formulary.Formulary) (LocalShare, refusal.List) {
	s := LocalShare{Drug: g.Drug, Amount: quantity.AmountOf(new(big.Rat), g.Concentration.Unit())}
	w := l.work(g, f)
	if !w.localMost(g, &s) {
		return s, w.told()
	}
	var err error
	if g.Volume.Given() {
		if s.Amount, err = g.Volume.Holds(g.Concentration); err != nil {
			w.fault(err, g.Drug, refusal.Pos{})
			return s, w.told()
		}
	}
	if s.Share, err = s.Amount.Share(s.Most); err == nil {
		s.MostVolume, err = s.Most.DrawnAt(g.Concentration)
	}
	if err != nil {
		w.fault(err, g.Drug, refusal.Pos{})
	}
	return s, w.told()
}

// work is the sum of one drug as work on a syringe.
func (l LocalSum) work(g LocalGiven, f *formulary.Formulary) *work {
	fixed := Quick{Drug: g.Drug, Weight: l.Weight, Age: l.Age, Route: l.Route, Style: l.Style}
	w := &work{f: f, fixed: &fixed, size: body.Size{Age: l.Age, Weight: l.Weight}}
	w.o = order.Syringe{Drug: order.Field[string]{Value: g.Drug, Text: g.Drug}}
	w.plan = Plan{Order: w.o, Size: w.size, Style: l.Style, Route: l.Route}
	return w
}

// localMost settles the maximum: the user's, the formulary's, or the lower one.
func (w *work) localMost(g LocalGiven, s *LocalShare) bool {
	typed, ok := w.typedMost(g, s)
	if !ok {
		return false
	}
	if typed && w.nobodysRecord(g.Drug) {
		w.plan.Drug.Name = g.Drug
		return w.caution(refusal.Reason{
			Code: refusal.LimitsNotChecked, Field: g.Drug, Rule: "R10", Got: g.Drug, Want: "a drug of the formulary",
			Message: fmt.Sprintf("%q is not in the formulary: its maximum, %s, is the one that was typed", g.Drug, s.Words),
			Remedy:  "compare it with the pack in the hand and local policy",
		})
	}
	if !w.findDrug() {
		return false
	}
	if w.plan.Drug.Class != localClass {
		return w.refuse(refusal.Reason{
			Code: refusal.ValueUnknown, Field: "drug", Got: w.plan.Drug.Name, Want: "a local anaesthetic", Rule: "R10",
			Message: w.plan.Drug.Name + " is not a local anaesthetic of the formulary",
			Remedy:  "use drawup dose for other drugs",
		})
	}
	own := *s
	if !w.storedMost(s) {
		return false
	}
	if !typed {
		return true
	}
	return w.lowerMost(own, s)
}

// nobodysRecord reports a local anaesthetic that the formulary has under no name,
// so that the user's own maximum is all there is. A misspelt name and a name with
// a word added are none: they would pass by the stored maximum (rule R11). Only
// "with adrenaline" makes another drug of it.
func (w *work) nobodysRecord(name string) bool {
	_, near, known := w.f.Find(name)
	if known || len(near) > 0 {
		return false
	}
	for _, d := range w.f.Drugs() {
		rest, ok := strings.CutPrefix(strings.ToLower(name), d.Name+" ")
		if ok && rest != "with adrenaline" && rest != "with epinephrine" {
			return false
		}
	}
	return true
}

// localClass is the label class of local anaesthetics.
const localClass = "LA"

// lowerMost takes the user's own maximum unless it is above the stored one.
func (w *work) lowerMost(own LocalShare, s *LocalShare) bool {
	n, err := own.Most.Cmp(s.Most)
	if err != nil {
		return w.fault(err, s.Drug, refusal.Pos{})
	}
	if n > 0 {
		return w.refuse(refusal.Reason{
			Code: refusal.DoseAboveHard, Field: s.Drug, Got: own.Words, Want: "at most " + s.Words, Rule: "R11", Source: s.Source,
			Message: fmt.Sprintf("the maximum that was typed for %s, %s, is above the stored one, %s", s.Drug, own.Words, s.Words),
			Remedy:  "leave it out, or type a lower one",
		})
	}
	s.Most, s.Words, s.Source, s.Typed, s.By = own.Most, own.Words, own.Source, true, 0
	return true
}

// typedMost is the user's own maximum for this patient, if there is one.
func (w *work) typedMost(g LocalGiven, s *LocalShare) (typed, ok bool) {
	if g.MostPerKg.Given() {
		weight, surface, err := w.localScalar(g.MostPerKg, body.Actual)
		if err == nil {
			s.Most, err = absolute(g.MostPerKg, weight, surface)
		}
		if err != nil {
			return true, w.sizeFault(err, g.Drug, refusal.Pos{})
		}
		s.Words = w.plan.Style.Dose(g.MostPerKg)
	}
	if n, err := g.MostInAll.Cmp(s.Most); g.MostInAll.Given() && (!s.Most.Given() || err == nil && n < 0) {
		s.Most, s.Words = g.MostInAll, w.plan.Style.Amount(g.MostInAll)
	}
	s.Typed, s.Source = s.Most.Given(), "as typed"
	return s.Typed, true
}

func (w *work) localScalar(d quantity.Dose, by body.Kind) (quantity.BodyWeight, quantity.BodySurfaceArea, error) {
	weight, surface, _, err := w.scalar(d.Basis(), by)
	return weight, surface, err
}

// storedMost is the lowest maximum of the rows that fit route and age: the
// highest dose of each, or its absolute maximum where that is less.
func (w *work) storedMost(s *LocalShare) bool {
	if w.plan.Route == "" {
		var routes []string
		for _, r := range w.plan.Drug.Doses {
			routes = append(routes, r.Routes...)
		}
		return w.refuse(refusal.Reason{
			Code: refusal.RouteNotListed, Field: "route", Want: joinOr(unique(routes)), Rule: "R10",
			Message: "the maximum of " + w.plan.Drug.Name + " depends on where it is given, and no route is named",
			Remedy:  "write route = one of: " + joinOr(unique(routes)),
		})
	}
	rows, ok := fittingRows(w, w.plan.Drug.Doses, "dose")
	if !ok {
		return false
	}
	s.Most = quantity.Amount{}
	for _, row := range rows {
		if err := w.lowestMost(row, s); err != nil {
			return w.sizeFault(err, "dose", refusal.Pos{})
		}
	}
	return true
}

// lowestMost keeps the maximum of a row in s if it is the lowest so far.
func (w *work) lowestMost(row formulary.Rule[quantity.Dose], s *LocalShare) error {
	take := func(a quantity.Amount, words, source string) error {
		if s.Most.Given() {
			if n, err := a.Cmp(s.Most); err != nil || n >= 0 {
				return err
			}
		}
		s.Most, s.Words, s.Source, s.By = a, words, source, row.By
		return nil
	}
	for _, f := range []formulary.Figure[quantity.Dose]{row.HardHigh, row.SoftHigh, row.UsualHigh} {
		if !f.Given() {
			continue
		}
		weight, surface, err := w.localScalar(f.Value, row.By)
		if err != nil {
			return err
		}
		a, err := absolute(f.Value, weight, surface)
		if err == nil {
			err = take(a, w.plan.Style.Dose(f.Value), sourceWords(f.Source, f.Unverified))
		}
		if err != nil {
			return err
		}
		break
	}
	if f := row.TotalMax; f.Given() {
		return take(f.Value, w.plan.Style.Amount(f.Value), sourceWords(f.Source, f.Unverified))
	}
	return nil
}
