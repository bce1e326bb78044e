package dilution

import (
	"fmt"
	"math/big"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// checkConcentration holds the syringe against the bounds of its use (R12:
// both ends count).
func (w *work) checkConcentration() bool {
	line := w.line()
	rows, central := w.boundsFor(line)
	if purposes := w.boundedPurposes(); len(rows) == 0 && !w.o.Indication.Given() && len(purposes) > 0 {
		return w.refuse(refusal.Reason{
			Code: refusal.IndicationUnclear, Field: "indication",
			Want: joinOr(quoted(purposes)), Rule: "R10", Pos: w.o.Pos,
			Message: fmt.Sprintf("the concentrations of %s for %s depend on what it is for, and the order does not say",
				w.plan.Drug.Name, w.use()),
			Remedy: "write indication = one of: " + joinOr(quoted(purposes)),
		})
	}
	if len(rows) == 0 {
		remedy := "add bounds with their source to the formulary (whoever keeps it does that)"
		if central {
			remedy = "if it goes into a central line, write line = \"central\"; otherwise " + remedy
		}
		return w.refuse(refusal.Reason{
			Code: refusal.FormularyBlank, Field: "concentration bounds",
			Got: line + " line", Want: "bounds for " + w.use(),
			Rule: "R10", Pos: w.o.Pos,
			Message: fmt.Sprintf("the formulary has no concentration bounds of %s for %s into a %s line",
				w.plan.Drug.Name, w.use(), line),
			Remedy: remedy,
		})
	}
	ok := true
	for _, b := range rows {
		ok = w.within(b) && ok
	}
	return w.diluentStrength() && ok
}

// boundedPurposes are the indications that have bounds of their own for this use.
func (w *work) boundedPurposes() []string {
	var out []string
	for _, b := range w.plan.Drug.Bounds {
		if b.Use == w.use() && b.For != "" {
			out = append(out, b.For)
		}
	}
	return unique(out)
}

// line is the line that the syringe goes into, peripheral unless the order says
// otherwise.
func (w *work) line() string {
	if w.o.Line.Given() {
		return w.o.Line.Value
	}
	return "peripheral"
}

// boundsFor is the rows for this use, line, route, indication and age. Of those
// that fit, the ones that name most of route, indication and age hold; among
// them a row for the very line goes before one for any line.
func (w *work) boundsFor(line string) (rows []formulary.Bounds, central bool) {
	var fitting []formulary.Bounds
	most := 0
	for _, b := range w.plan.Drug.Bounds {
		if b.Use != w.use() || !b.Fits(w.plan.Route, w.o.Indication.Value, w.size.Age) {
			continue
		}
		central = central || b.Line == "central"
		if b.Line != line && b.Line != "any" {
			continue
		}
		if n := b.Special(); n > most {
			fitting, most = nil, n
		} else if n < most {
			continue
		}
		fitting = append(fitting, b)
	}
	for _, b := range fitting {
		if b.Line == line {
			rows = append(rows, b)
		}
	}
	if len(rows) == 0 {
		rows = fitting
	}
	return rows, central
}

func (w *work) within(b formulary.Bounds) bool {
	c, s := w.plan.Mixture.Concentration, w.plan.Style
	if !b.Low.Given() || !b.High.Given() {
		return w.refuse(refusal.Reason{
			Code: refusal.FormularyBlank, Field: "concentration bounds",
			Want: "a lowest and a highest concentration", Rule: "R12",
			Pos: w.o.Pos,
			Message: fmt.Sprintf("the formulary lacks one end of the concentration bounds of %s for %s",
				w.plan.Drug.Name, b.Use),
			Remedy: "add it with its source to the formulary (whoever keeps it does that)",
		})
	}
	if n, err := c.Cmp(b.High.Value); err != nil {
		return w.fault(err, "concentration", w.o.Pos)
	} else if n > 0 {
		return w.refuse(refusal.Reason{
			Code: refusal.ConcentrationTooHigh, Field: "concentration",
			Got: s.Concentration(c), Want: "at most " + s.Concentration(b.High.Value),
			Rule: "R10", Source: b.High.Source.Title,
			Pos: w.o.Pos,
			Message: fmt.Sprintf("%s is stronger than %s may be for %s, %s line",
				s.Concentration(c), w.plan.Drug.Name, b.Use, b.Line),
			Remedy: "order a larger volume or a smaller amount",
		})
	}
	if n, _ := c.Cmp(b.Low.Value); n < 0 {
		return w.refuse(refusal.Reason{
			Code: refusal.ConcentrationTooLow, Field: "concentration",
			Got: s.Concentration(c), Want: "at least " + s.Concentration(b.Low.Value),
			Rule: "R12", Source: b.Low.Source.Title,
			Pos: w.o.Pos,
			Message: fmt.Sprintf("%s is weaker than %s may be for %s, %s line",
				s.Concentration(c), w.plan.Drug.Name, b.Use, b.Line),
			Remedy: "order a smaller volume or a larger amount",
		})
	}
	return true
}

// A verdict is what one row of limits says of one value.
type verdict struct {
	rank    int // 0 fine, 1 caution, 2 needs a signature, 3 refused
	reasons refusal.List
}

func (v *verdict) say(rank int, r refusal.Reason) {
	if rank > v.rank {
		v.rank = rank
	}
	r.Severity = refusal.Caution
	if rank == 3 {
		r.Severity = refusal.Refuse
	}
	v.reasons = append(v.reasons, r)
}

// codes are the refusal codes of one family of limits.
type codes struct {
	aboveHard, aboveSoft, aboveUsual, belowHard, belowUsual refusal.Code
}

var doseCodes = codes{
	refusal.DoseAboveHard, refusal.DoseAboveSoft, refusal.DoseAboveUsual,
	refusal.DoseBelowHard, refusal.DoseBelowSoft,
}
var rateCodes = codes{
	refusal.RateAboveHard, refusal.RateAboveSoft, refusal.RateAboveUsual,
	refusal.RateBelowHard, refusal.RateBelowSoft,
}

// A bound is one figure of a row as a bare number in a common unit, so that
// doses and dose rates share one set of checks.
type bound struct {
	given  bool
	value  *big.Rat
	text   string
	source string
}

// A scale is a row of limits, all in one unit, and the value held against it.
type scale struct {
	what                                             string // "dose", "dose rate"
	field                                            string
	value                                            *big.Rat
	text                                             string
	hardLow, usualLow, usualHigh, softHigh, hardHigh bound
	codes                                            codes
	acceptedBy, acceptedReason                       string
	pos                                              refusal.Pos
	row                                              string // "induction, from 18 years"
}

// top is the highest figure that the row stores.
func (s scale) top() bound {
	for _, b := range []bound{s.hardHigh, s.softHigh, s.usualHigh} {
		if b.given {
			return b
		}
	}
	return bound{}
}

// ceilings are the figures that rounding must not pass: the highest stored, and
// a soft limit that nobody has signed for.
func (s scale) ceilings() []bound {
	out := []bound{s.top()}
	if s.softHigh.given && (s.acceptedBy == "" || s.acceptedReason == "") {
		out = append(out, s.softHigh)
	}
	return out
}

// passed is the ceiling that wanted keeps and given does not, nil if none.
func passed(ceilings []bound, wanted, given *big.Rat) *bound {
	for i, c := range ceilings {
		if c.given && wanted.Cmp(c.value) <= 0 && given.Cmp(c.value) > 0 {
			return &ceilings[i]
		}
	}
	return nil
}

// bottom is the lowest figure that the row stores.
func (s scale) bottom() bound {
	for _, b := range []bound{s.hardLow, s.usualLow, s.usualHigh, s.softHigh, s.hardHigh} {
		if b.given {
			return b
		}
	}
	return bound{}
}

// judge holds the value against the row, from the worst fault down.
func (s scale) judge() verdict {
	var v verdict
	switch {
	case s.value.Cmp(s.top().value) > 0:
		v.say(3, s.tooMuch())
	case s.hardLow.given && s.value.Cmp(s.hardLow.value) < 0:
		v.say(3, s.reason(s.slipUnder(s.codes.belowHard), s.hardLow, "less than the lowest that may be given"))
	case s.usualLow.given && times(s.value, 10).Cmp(s.usualLow.value) <= 0:
		v.say(3, s.reason(s.slipUnder(refusal.SlipTen), s.usualLow,
			"a tenth of the usual lowest or less; is a decimal point or a unit wrong?"))
	case s.softHigh.given && s.value.Cmp(s.softHigh.value) > 0:
		s.soft(&v)
	case s.usualHigh.given && s.value.Cmp(s.usualHigh.value) > 0:
		v.say(1, s.reason(s.codes.aboveUsual, s.usualHigh, "more than usual"))
	case s.usualLow.given && s.value.Cmp(s.usualLow.value) < 0:
		v.say(1, s.reason(s.codes.belowUsual, s.usualLow, "less than usual"))
	}
	if !s.usualLow.given && !s.hardLow.given && v.rank < 3 {
		r := s.reason(refusal.FormularyBlank, bound{},
			"checked upwards only: the formulary stores no lower figure, so a slip downwards would not be caught")
		v.say(1, r)
	}
	return v
}

// soft lets a value pass a soft limit only with a name and a reason (R11).
func (s scale) soft(v *verdict) {
	if s.acceptedBy != "" && s.acceptedReason != "" {
		r := s.reason(s.codes.aboveSoft, s.softHigh,
			fmt.Sprintf("above the soft limit; accepted by %s: %s", s.acceptedBy, s.acceptedReason))
		v.say(1, r)
		return
	}
	r := s.reason(refusal.SoftLimitNotSigned, s.softHigh, "above the soft limit, and nobody has signed for it")
	r.Rule, r.Remedy = "R11", "check it; if it is meant, write accepted_by and accepted_reason, which are printed"
	v.say(3, r)
}

// How far above the highest stored figure a value must lie before a slip is
// named: our own choice. Wide ranges would otherwise turn every larger dose
// into a "tenfold slip". The value is refused either way.
const (
	farTen      = 5
	farThousand = 50
)

// tooMuch refuses a value above the highest stored figure. It names a likely
// slip when the value would be right without it.
func (s scale) tooMuch() refusal.Reason {
	switch {
	case s.wouldFit(1000) && s.beyond(farThousand):
		return s.reason(refusal.SlipThousand, s.top(),
			"far above the stored range, and a thousandth of it would fit; is milligram written for microgram?")
	case s.wouldFit(10) && s.beyond(farTen):
		return s.reason(refusal.SlipTen, s.top(),
			"far above the stored range, and a tenth of it would fit; is a decimal point wrong?")
	}
	r := s.reason(s.codes.aboveHard, s.top(), "more than the highest that the formulary allows")
	if !s.hardHigh.given {
		r.Code, r.Rule = refusal.FormularyBlank, "R10"
		r.Message = fmt.Sprintf("%s %s is above the highest figure stored (%s), and no hard limit is stored for %s",
			s.what, s.text, s.top().text, s.row)
		r.Remedy = "stay within the stored range, or add a hard limit with its source to the formulary " +
			"(whoever keeps it does that)"
	}
	return r
}

// wouldFit reports whether the value, divided by n, lies in the stored range.
func (s scale) wouldFit(n int64) bool {
	v := new(big.Rat).Quo(s.value, big.NewRat(n, 1))
	return v.Cmp(s.bottom().value) >= 0 && v.Cmp(s.top().value) <= 0
}

// beyond reports whether the value is n times the highest stored figure or more.
func (s scale) beyond(n int64) bool { return s.value.Cmp(times(s.top().value, n)) >= 0 }

// slipUnder names the larger slip downwards when ten times the value is still
// too little and a thousand times it would fit, or when it is that far off.
func (s scale) slipUnder(other refusal.Code) refusal.Code {
	if !s.usualLow.given || times(s.value, 10).Cmp(s.usualLow.value) >= 0 {
		return other
	}
	thousand := times(s.value, 1000)
	fits := thousand.Cmp(s.bottom().value) >= 0 && thousand.Cmp(s.top().value) <= 0
	if fits || times(s.value, 500).Cmp(s.usualLow.value) <= 0 {
		return refusal.SlipThousand
	}
	return other
}

func times(r *big.Rat, n int64) *big.Rat { return new(big.Rat).Mul(r, big.NewRat(n, 1)) }

func (s scale) reason(code refusal.Code, b bound, words string) refusal.Reason {
	r := refusal.Reason{
		Code: code, Field: s.field,
		Got: s.text, Want: b.text,
		Rule: "R10", Source: b.source,
		Pos:     s.pos,
		Message: fmt.Sprintf("%s %s is %s (%s)", s.what, s.text, words, s.row),
		Remedy:  "check the " + s.what + ", its unit and the weight",
	}
	if code == s.codes.aboveHard || code == s.codes.belowHard {
		r.Rule = "R11"
	}
	return r
}

// boundOf makes a bound of a figure; number gives its value in the common unit.
func boundOf[T any](f formulary.Figure[T], print func(T) string, number func(T) (*big.Rat, error)) (bound, error) {
	if !f.Given() {
		return bound{}, nil
	}
	n, err := number(f.Value)
	if err != nil {
		return bound{}, err
	}
	return bound{given: true, value: n, text: print(f.Value), source: sourceWords(f.Source, f.Unverified)}, nil
}

func sourceWords(s formulary.Source, unverified bool) string {
	if unverified {
		return s.Title + " (unverified)"
	}
	return s.Title
}

// fillScale turns a row into bounds.
func fillScale[T any](s *scale, r formulary.Rule[T], print func(T) string, number func(T) (*big.Rat, error)) error {
	for _, x := range []struct {
		to   *bound
		from formulary.Figure[T]
	}{
		{&s.hardLow, r.HardLow},
		{&s.usualLow, r.UsualLow},
		{&s.usualHigh, r.UsualHigh},
		{&s.softHigh, r.SoftHigh},
		{&s.hardHigh, r.HardHigh},
	} {
		b, err := boundOf(x.from, print, number)
		if err != nil {
			return err
		}
		*x.to = b
	}
	s.row = r.For
	if ages := r.Ages(); ages != "" {
		s.row += ", " + ages
	}
	return nil
}

// routeListed reports whether a row allows the route.
func routeListed(routes []string, route string) bool {
	for _, r := range routes {
		if r == route {
			return true
		}
	}
	return false
}

// unitKind is the kind check before a dose meets a row.
func unitKind(got, want quantity.Kind) error {
	if got != want {
		return &quantity.KindError{Got: got, Want: want}
	}
	return nil
}
