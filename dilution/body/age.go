package body

import (
	"math/big"
	"strconv"
	"strings"

	"drawup/dilution/quantity"
)

// An ageUnit is the unit in which an age was written.
type ageUnit int

const (
	days ageUnit = iota + 1
	weeks
	months
	years
)

// An Age is a person's age as written: completed days, weeks, months or years.
// The zero value means "not given".
//
// Ages of unlike units are compared through the mean calendar year of 365.2425
// days (the Gregorian calendar: 146,097 days in 400 years) and a month of a
// twelfth of it. So 12 months are 1 year, 30 days are under 1 month and 31
// days are not. The same unit is compared exactly.
type Age struct {
	_    [0]func() // forbids ==: 12 months are 1 year
	n    int
	unit ageUnit
	text string
}

// oldest is the highest age read, in years. It catches slips such as a weight
// or a year of birth in the place of the age; nobody has grown so old.
const oldest = 130

// wantAge is what a right text looks like.
const wantAge = `an age in whole years, months, weeks or days, such as "82 years"`

// ParseAge reads an age such as "82 years", "82 y", "14 months", "3 weeks",
// "10 days": a whole number and its unit, up to 130 years. A newborn is
// "0 days"; no other unit takes zero. Errors are *quantity.SyntaxError.
func ParseAge(s string) (Age, error) {
	fault := func(code quantity.Fault, why, likely string) (Age, error) {
		return Age{}, &quantity.SyntaxError{Got: s, Want: wantAge, Why: why, Likely: likely, Code: code}
	}
	text := strings.TrimSpace(s)
	if text == "" {
		return fault(quantity.EmptyText, "there is nothing", "")
	}
	end := strings.IndexFunc(text, func(r rune) bool { return r < '0' || r > '9' })
	switch {
	case end < 0:
		return fault(quantity.UnknownUnit, "the unit is missing", text+" years")
	case end == 0:
		return fault(quantity.BadNumber, "it does not begin with plain digits", "")
	case end > 1 && text[0] == '0':
		return fault(quantity.BadNumber, "the number begins with a zero", "")
	}
	number, word := text[:end], strings.TrimLeft(text[end:], " \u00a0\u202f")
	if word != "" && strings.ContainsRune(".,+-\u2212\u2013\u00bd/", []rune(word)[0]) {
		return fault(quantity.BadNumber, "the number is not whole: use the smaller unit, \"18 months\" for one year and a half", "")
	}
	unit, ok := ageUnitNamed(word)
	if !ok {
		return fault(quantity.UnknownUnit, "the unit is not one of years, months, weeks, days", "")
	}
	n, err := strconv.Atoi(number)
	if err != nil || n > oldest*366 || (Age{n: n, unit: unit}).inDays().Cmp(big.NewRat(oldest*3652425, 10000)) > 0 {
		return fault(quantity.TooManyDigit, "nobody is older than 130 years", "")
	}
	if n == 0 && unit != days {
		return fault(quantity.ZeroOrLess, "an age of nothing is only exact in days", "0 days")
	}
	return Age{n: n, unit: unit, text: s}, nil
}

// ageUnitNamed knows the spellings that the second route knows as well.
func ageUnitNamed(s string) (ageUnit, bool) {
	switch s {
	case "day", "days":
		return days, true
	case "week", "weeks":
		return weeks, true
	case "month", "months":
		return months, true
	case "y", "yr", "year", "years":
		return years, true
	}
	return 0, false
}

// Given reports whether there is an age at all.
func (a Age) Given() bool { return a.unit != 0 }

// Written is the text the age was read from, "" if not given.
func (a Age) Written() string { return a.text }

// String is the age as printed and as a bound: "82 years", "1 month", "" if
// not given.
func (a Age) String() string {
	var word string
	switch a.unit {
	case days:
		word = "day"
	case weeks:
		word = "week"
	case months:
		word = "month"
	case years:
		word = "year"
	default:
		return ""
	}
	if a.n != 1 {
		word += "s"
	}
	return strconv.Itoa(a.n) + " " + word
}

// inDays is the age in days, by the mean calendar year; 0 if not given.
func (a Age) inDays() *big.Rat {
	n := new(big.Rat).SetInt64(int64(a.n))
	switch a.unit {
	case days:
		return n
	case weeks:
		return n.Mul(n, big.NewRat(7, 1))
	case months:
		return n.Mul(n, big.NewRat(3652425, 120000))
	case years:
		return n.Mul(n, big.NewRat(3652425, 10000))
	}
	return new(big.Rat)
}

// Years is how many whole years are completed, rounded down; 0 if not given.
func (a Age) Years() int {
	switch a.unit {
	case years:
		return a.n
	case months:
		return a.n / 12
	case days, weeks:
		y := new(big.Rat).Quo(a.inDays(), big.NewRat(3652425, 10000))
		return int(new(big.Int).Div(y.Num(), y.Denom()).Int64())
	}
	return 0
}

// Months is how many whole months are completed, rounded down; 0 if not given.
func (a Age) Months() int {
	switch a.unit {
	case years:
		return 12 * a.n
	case months:
		return a.n
	case days, weeks:
		m := new(big.Rat).Quo(a.inDays(), big.NewRat(3652425, 120000))
		return int(new(big.Int).Div(m.Num(), m.Denom()).Int64())
	}
	return 0
}

// Cmp compares two ages: -1, 0 or +1. Both must be given; an age that is not
// given counts as the youngest.
func (a Age) Cmp(b Age) int {
	switch {
	case !a.Given() && !b.Given():
		return 0
	case !a.Given():
		return -1
	case !b.Given():
		return 1
	}
	return a.inDays().Cmp(b.inDays())
}

// Less reports whether both ages are given and a is the younger one.
func (a Age) Less(b Age) bool { return a.Given() && b.Given() && a.Cmp(b) < 0 }
