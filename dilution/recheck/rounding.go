package recheck

import "math/big"

// A rounding says which way a figure was brought to its step.
type rounding int

const (
	halfUp rounding = iota + 1
	upward
	downward
)

// An objection is what the second route has against one printed figure.
type objection struct {
	gets string
	why  string
}

func object(gets, why string) *objection { return &objection{gets: gets, why: why} }

// roundsTo says whether truth, brought to the step, is printed. It never
// rounds: it asks whether truth lies in the interval that the rule maps onto
// the printed figure.
//
//	half up   printed - half a step <= truth <  printed + half a step
//	upward    printed - a step      <  truth <= printed
//	downward  printed               <= truth <  printed + a step
func roundsTo(printed, truth, step value, how rounding) bool {
	if !printed.isMultiple(step) {
		return false
	}
	half := step.times(pair(1, 2))
	switch how {
	case halfUp:
		return printed.minus(half).against(truth) <= 0 && truth.against(printed.plus(half)) < 0
	case upward:
		return printed.minus(step).against(truth) < 0 && truth.against(printed) <= 0
	case downward:
		return printed.against(truth) <= 0 && truth.against(printed.plus(step)) < 0
	}
	return false
}

// onStep objects unless printed is truth brought to the step.
func onStep(r reading, truth, step value, how rounding) *objection {
	if truth.lack != "" {
		return object("", truth.lack)
	}
	if step.lack != "" {
		return object("", step.lack)
	}
	if r.whole.dim != truth.dim || r.whole.dim != step.dim {
		return object("", "kinds do not match: printed "+r.whole.dim.words()+", worked "+truth.dim.words()+", step "+step.dim.words())
	}
	if step.sign() <= 0 {
		return object("", "the step is nothing")
	}
	if roundsTo(r.whole, truth, step, how) {
		return nil
	}
	return object(nearest(truth, step, how, r.unit), "")
}

// power finds e with 10^e <= x < 10^(e+1) for an x above zero, as a value
// 10^(e - back). The search is bounded by the digits that x has.
func power(x value, back int) value {
	e := len(x.num.String()) - len(x.den.String())
	if x.against(tenTo(e)) < 0 {
		e--
	}
	return tenTo(e - back)
}

// tenTo is ten to the power e, e of either sign.
func tenTo(e int) value {
	if e < 0 {
		return value{num: big.NewInt(1), den: tens(-e)}
	}
	return value{num: tens(e), den: big.NewInt(1)}
}

// isShort says whether the number x is printed as p by RULE SHORT: exactly, if
// four significant digits hold it; else half up to three, or to a whole number
// from 1,000.
func isShort(p, x value) bool {
	if x.sign() <= 0 {
		return x.sign() == 0 && p.sign() == 0
	}
	if x.isMultiple(power(x, 3)) {
		return p.against(x) == 0
	}
	return roundsTo(p, x, shortStep(x), halfUp)
}

func shortStep(x value) value {
	if x.against(whole(1_000)) >= 0 {
		return whole(1)
	}
	return power(x, 2)
}

// short objects unless the figure is truth printed by RULE SHORT in its unit;
// volumes in mL and flow rates in mL/h that two decimals hold are exact.
func short(r reading, truth value) *objection {
	if truth.lack != "" {
		return object("", truth.lack)
	}
	if r.whole.dim != truth.dim {
		return object("", "kinds do not match: printed "+r.whole.dim.words()+", worked "+truth.dim.words())
	}
	x := truth.over(r.unit)
	if onScale(r.unit, x) {
		if r.number.against(x) == 0 {
			return nil
		}
		return object(decimal(x, 2), "two decimals hold it")
	}
	if isShort(r.number, x) {
		return nil
	}
	return object(shortWords(truth, r.unit), "")
}

// onScale says whether a number of mL or mL/h is printed exactly because two
// decimals are enough, however many digits stand before them.
func onScale(unit, x value) bool {
	for _, u := range []value{whole(1).ofKind(one(inVolume)), perHour()} {
		if unit.dim == u.dim && unit.against(u) == 0 {
			return x.isMultiple(pair(1, 100))
		}
	}
	return false
}

// exact objects unless the figure is truth, digit for digit.
func exact(r reading, truth value, why string) *objection {
	if truth.lack != "" {
		return object("", truth.lack)
	}
	if r.whole.dim != truth.dim {
		return object("", "kinds do not match: printed "+r.whole.dim.words()+", "+why+" "+truth.dim.words())
	}
	if r.whole.against(truth) == 0 {
		return nil
	}
	return object(plainWords(truth, r.unit), why)
}
