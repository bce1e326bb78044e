package recheck

import (
	"math/big"
	"strings"
)

// This file writes numbers for messages. It is the only place where a whole
// number is divided; no verdict hangs on what it writes.

// decimal writes a pair as a decimal with at most the given places, cut off,
// trailing zeros dropped; "about" tells that something was cut.
func decimal(x value, places int) string {
	scaled := new(big.Int).Mul(x.num, tens(places))
	q, rest := new(big.Int).QuoRem(scaled, x.den, new(big.Int))
	sign := ""
	if q.Sign() < 0 {
		sign = "-"
		q.Neg(q)
	}
	digits := q.String()
	if len(digits) <= places {
		digits = strings.Repeat("0", places-len(digits)+1) + digits
	}
	cut := len(digits) - places
	out := sign + digits[:cut]
	if tail := strings.TrimRight(digits[cut:], "0"); tail != "" {
		out += "." + tail
	}
	if rest.Sign() != 0 {
		return "about " + out
	}
	return out
}

// plainWords writes truth in the printed unit.
func plainWords(truth, unit value) string { return decimal(truth.over(unit), 8) }

// floorTimes brings x down to a multiple of step.
func floorTimes(x, step value) value {
	n := new(big.Int).Mul(x.num, step.den)
	d := new(big.Int).Mul(x.den, step.num)
	q := new(big.Int).Div(n, d)
	return value{num: q, den: big.NewInt(1)}.times(step)
}

// nearest writes what truth gives on the step, in the printed unit.
func nearest(truth, step value, how rounding, unit value) string {
	x := truth.over(unit)
	s := step.over(unit)
	lifted := x
	if how == halfUp {
		lifted = x.plus(s.times(pair(1, 2)))
	}
	on := floorTimes(lifted, s)
	if how == upward && on.against(x) < 0 {
		on = on.plus(s)
	}
	return decimal(on, 8) + " (before rounding: " + decimal(x, 8) + ")"
}

// shortWords writes truth by RULE SHORT, in the printed unit.
func shortWords(truth, unit value) string {
	x := truth.over(unit)
	if x.sign() <= 0 || x.isMultiple(power(x, 3)) {
		return decimal(x, 12)
	}
	step := shortStep(x)
	return decimal(floorTimes(x.plus(step.times(pair(1, 2))), step), 12) + " (before rounding: " + decimal(x, 12) + ")"
}
