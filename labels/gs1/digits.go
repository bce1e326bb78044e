package gs1

import (
	"fmt"
	"slices"
)

// unjudged are the checkers of the dictionary that are not done here: lists of
// other standards, coupons, bank accounts, places, company prefixes, and forms
// that no medicine carries.
var unjudged = []string{
	"couponcode", "couponposoffer", "csumalpha", "gcppos1", "gcppos2", "hasnondigit", "hyphen", "iban", "importeridx",
	"iso3166", "iso3166999", "iso3166alpha2", "iso4217", "iso5218", "latitude", "longitude", "mediatype", "nonzero",
	"nozeroprefix", "packagetype", "pcenc", "pieceoftotal", "posinseqslash", "winding", "yesno", "zero",
}

// judge holds a piece of a value against one checker of the dictionary; nil
// when it passes or is not judged. Its set and length are right already.
func judge(name, value string) *Fault {
	switch name {
	case "csum":
		return checkSum(value)
	case "yymmd0":
		return dayFault(value, 2, two(value), true)
	case "yymmdd":
		return dayFault(value, 2, two(value), false)
	case "yyyymmdd":
		return dayFault(value, 4, 100*two(value)+two(value[2:]), false)
	case "hhmi":
		if f := below(value, 0, 24); f != nil {
			return f
		}
		return below(value, 2, 60)
	case "hh":
		return below(value, 0, 24)
	case "mi", "ss":
		return below(value, 0, 60)
	}
	if slices.Contains(unjudged, name) {
		return nil
	}
	return &Fault{Kind: Foreign, Got: "the unknown checker " + name, Want: "one that this package knows"}
}

// CheckDigit is the check digit of a number whose other digits are given: weights 3
// and 1 from the right, filled up to the next ten. It wants digits only.
func CheckDigit(body string) (byte, error) {
	sum := 0
	for i := range body {
		c := body[len(body)-1-i]
		if c < '0' || c > '9' {
			return 0, fmt.Errorf("got %q, want digits", body)
		}
		weight := 3
		if i%2 == 1 {
			weight = 1
		}
		sum += weight * int(c-'0')
	}
	return byte('0' + (10-sum%10)%10), nil
}

// checkSum wants digits of which the last checks the others.
func checkSum(value string) *Fault {
	last := len(value) - 1
	want, err := CheckDigit(value[:last])
	if err == nil && value[last] == want {
		return nil
	}
	return &Fault{Kind: WrongDigit, Got: fmt.Sprintf("the check digit %c in %q", value[last], value), Want: string(want), offset: last}
}

// two is the number in two digits; the caller has made sure of digits.
func two(s string) int { return int(s[0]-'0')*10 + int(s[1]-'0') }

// below wants the two digits at a place to be under a bound.
func below(value string, at, bound int) *Fault {
	if two(value[at:]) < bound {
		return nil
	}
	return &Fault{Kind: Moment, Got: fmt.Sprintf("the time %q", value), Want: "hours from 00 to 23, minutes from 00 to 59", offset: at}
}

// dayFault wants a month and a day that exist, from the place of the month on.
// Where whole is set, day 00 stands for the month as a whole. Of two-digit years
// every fourth is a leap year: 2000 was one.
func dayFault(value string, at, year int, whole bool) *Fault {
	month, day := two(value[at:]), two(value[at+2:])
	fault := &Fault{Kind: Moment, Got: fmt.Sprintf("the date %q", value), Want: "year, month and day that exist", offset: at}
	if month < 1 || month > 12 {
		return fault
	}
	fault.offset += 2
	if day > daysOf(month, year) || day == 0 && !whole {
		return fault
	}
	return nil
}

// daysOf a month; year as written, in two digits or four.
func daysOf(month, year int) int {
	switch month {
	case 4, 6, 9, 11:
		return 30
	case 2:
		if year%4 == 0 && (year%100 != 0 || year%400 == 0) {
			return 29
		}
		return 28
	}
	return 31
}

// Year is the year that two digits mean in the year now: the one with these
// digits from 49 years back to 50 ahead.
//
// Source: GS1 General Specifications, determination of the century in dates, as
// the dictionary's checker yymmd0 works it: digits 51 or more above those of
// now belong to the century before, 50 or more below to the one after.
func Year(digits, now int) int {
	year := now - now%100 + digits
	switch ahead := digits - now%100; {
	case ahead >= 51:
		return year - 100
	case ahead <= -50:
		return year + 100
	}
	return year
}
