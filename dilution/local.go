package dilution

import (
	"fmt"
	"math/big"
	"slices"
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
	Drug          string // "lidocaine", "lidocaine with adrenaline"
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
		Code: refusal.LocalSum, Severity: refusal.Refuse, Field: "local anaesthetics",
		Got: per, Want: "at most 100 %", Rule: "R11", Source: "common practice, no source; toxicity adds up: US prescribing information, bupivacaine",
		Message: "together they are " + per + " of the maximum: each takes its share of its own, and the shares add up",
		Remedy:  "give less, or weaker; no setting passes this limit",
	}
}

// share is one local anaesthetic against its maximum.
func (l LocalSum) share(g LocalGiven, f *formulary.Formulary) (LocalShare, refusal.List) {
	s := LocalShare{Drug: g.Drug, Amount: quantity.AmountOf(new(big.Rat), g.Concentration.Unit())}
	w := l.work(g, f)
	if !w.mostOf(g, &s) {
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
	name, _ := plainName(g.Drug)
	fixed := Quick{Drug: name, Weight: l.Weight, Age: l.Age, Style: l.Style}
	w := &work{f: f, fixed: &fixed, size: body.Size{Age: l.Age, Weight: l.Weight}}
	w.o = order.Syringe{Drug: order.Field[string]{Value: name, Text: name}}
	w.plan = Plan{Order: w.o, Size: w.size, Style: l.Style}
	return w
}

// plainName is the name of the drug alone, and whether it comes with adrenaline.
func plainName(name string) (string, bool) {
	for _, with := range []string{" with adrenaline", " with epinephrine"} {
		if plain, ok := strings.CutSuffix(strings.TrimSpace(name), with); ok {
			return strings.TrimSpace(plain), true
		}
	}
	return strings.TrimSpace(name), false
}

// mostOf settles the maximum: the user's, the formulary's, or the lower one.
func (w *work) mostOf(g LocalGiven, s *LocalShare) bool {
	typed, ok := w.typedMost(g, s)
	if !ok {
		return false
	}
	if typed && w.nobodysRecord(w.o.Drug.Value) {
		w.plan.Drug.Name = g.Drug
		return w.onlyTyped(g, s)
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
	_, adrenaline := plainName(g.Drug)
	kept := func(m formulary.LocalMaximum) bool { return m.WithAdrenaline == adrenaline }
	if typed && !slices.ContainsFunc(w.plan.Drug.LocalMaxima, kept) {
		return w.onlyTyped(g, s)
	}
	own := *s
	if !w.storedMost(g.Drug, kept, s) {
		return false
	}
	return !typed || w.lowerMost(own, s)
}

// onlyTyped cautions that nothing but the user's own maximum is known.
func (w *work) onlyTyped(g LocalGiven, s *LocalShare) bool {
	return w.caution(refusal.Reason{
		Code: refusal.LimitsNotChecked, Field: g.Drug, Rule: "R10", Got: g.Drug, Want: "a maximum in the formulary",
		Message: fmt.Sprintf("the formulary stores no maximum of %s: the one that was typed, %s, is all there is", g.Drug, s.Words),
		Remedy:  "compare it with the pack in the hand and local policy",
	})
}

// nobodysRecord reports a local anaesthetic that the formulary has under no name,
// so that the user's own maximum is all there is. A misspelt name and a name with
// a word added are none: they would pass by the stored maximum (rule R11).
func (w *work) nobodysRecord(name string) bool {
	_, near, known := w.f.Find(name)
	if known || len(near) > 0 {
		return false
	}
	return !slices.ContainsFunc(w.f.Drugs(), func(d formulary.Drug) bool {
		return strings.HasPrefix(strings.ToLower(name), d.Name+" ")
	})
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
		var err error
		if s.Most, err = w.amountOf(g.MostPerKg, body.Actual); err != nil {
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

// storedMost is the formulary's maximum for this patient, of the rows that are
// kept; what is missing for it is refused.
func (w *work) storedMost(name string, kept func(formulary.LocalMaximum) bool, s *LocalShare) bool {
	var bands []string
	fits := false
	for _, m := range w.plan.Drug.LocalMaxima {
		if kept(m) {
			fits = fits || m.Fits(w.size.Age)
			bands = append(bands, formulary.Rule[quantity.Dose]{AgeFrom: m.AgeFrom, AgeTo: m.AgeTo}.Ages())
		}
	}
	switch {
	case len(bands) == 0:
		return w.refuse(refusal.Reason{
			Code: refusal.FormularyBlank, Field: "maximum", Want: "a maximum of " + name, Rule: "R10",
			Message: "the formulary stores no maximum of " + name,
			Remedy:  "add it with its source to the formulary (whoever keeps it does that)",
		})
	case !fits && !w.size.Age.Given():
		return w.refuse(w.ageMissing("maximum"))
	case !fits:
		return w.refuse(w.ageOutside("maximum", bands))
	}
	m, err := w.localMaximum(false, kept)
	if err != nil {
		return w.sizeFault(err, "maximum", refusal.Pos{})
	}
	if !m.amount.Given() {
		return w.refuse(*w.localUnknown("the formulary stores no maximum for this patient"))
	}
	s.Most, s.Words, s.Source, s.By = m.amount, m.words, m.source, m.by
	return true
}
