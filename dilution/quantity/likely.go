package quantity

import (
	"errors"
	"math/big"
	"strings"
)

// This file says what a text that is refused probably meant. It only ever
// feeds SyntaxError.Likely; no value is made from it.

// settle reads s with read. If s is refused, the likely reading is kept only
// if it would itself be read, so that nobody is sent from one refusal to the
// next.
func settle[T any](s string, read func(string) (T, error)) (T, error) {
	v, err := read(s)
	var fault *SyntaxError
	if errors.As(err, &fault) && fault.Likely != "" {
		if _, again := read(fault.Likely); again != nil {
			fault.Likely = ""
		}
	}
	return v, err
}

// likelyNumber says what a number probably meant, without trailing zeros; ""
// if that is open. A minus or a dash is open: "-5" is not 5, "5-10" not 510.
// So is a zero in front: "05" may have been 0.5.
func likelyNumber(s string) string {
	for _, guess := range []func(string) string{justNumber, likelyComma, likelyExponent, likelyFraction, likelyGroups, likelyPoint} {
		if n := guess(s); n != "" {
			return trimZeros(n)
		}
	}
	return ""
}

func justNumber(s string) string {
	if t := strings.TrimPrefix(s, "+"); plainNumber(t) {
		return t
	}
	return ""
}

// likelyComma takes a comma in front of three digits for a thousand, and any
// other single comma for a decimal.
func likelyComma(s string) string {
	if joined, ok := ungroup(s, ","); ok {
		return joined
	}
	head, tail, comma := strings.Cut(s, ",")
	if !comma || !allDigits(tail) {
		return ""
	}
	if joined, ok := ungroup(head, "."); ok {
		head = joined
	}
	if len(tail) > 3 && head != "0" {
		return "" // a decimal or a thousand with a slip: open
	}
	if n := head + "." + tail; plainNumber(n) {
		return n
	}
	return ""
}

// likelyExponent writes out "1e3" and "5e-1".
func likelyExponent(s string) string {
	i := strings.IndexAny(s, "eE")
	if i < 0 || !plainNumber(s[:i]) {
		return ""
	}
	power := strings.TrimLeft(s[i+1:], "+-")
	if !allDigits(power) || len(power) > 2 || len(s)-i-1 > len(power)+1 {
		return ""
	}
	r, ok := new(big.Rat).SetString(s)
	if !ok {
		return ""
	}
	return exact{r: r}.text()
}

// likelyFraction writes out "1/2", "½" and "1½" where the decimal ends.
func likelyFraction(s string) string {
	if over, under, ok := strings.Cut(s, "/"); ok {
		if !plainNumber(over) || !plainNumber(under) || strings.Trim(under, "0.") == "" {
			return ""
		}
		a, _, _ := readNumber(over)
		b, _, _ := readNumber(under)
		if x := a.quo(b); x.given() {
			text, _ := x.decimal()
			return text
		}
		return ""
	}
	for _, f := range [][2]string{{"½", ".5"}, {"¼", ".25"}, {"¾", ".75"}, {"⅛", ".125"}, {"⅕", ".2"}} {
		head, ok := strings.CutSuffix(s, f[0])
		if head = strings.TrimSuffix(head, " "); ok && (head == "" || allDigits(head)) {
			if head == "" {
				head = "0"
			}
			return head + f[1]
		}
	}
	return ""
}

// likelyGroups joins digits that are set off in threes.
func likelyGroups(s string) string {
	for _, mark := range []string{" ", "'", "_"} {
		if joined, ok := ungroup(s, mark); ok {
			return joined
		}
	}
	if joined, ok := ungroup(s, "."); ok && strings.Count(s, ".") > 1 {
		return joined
	}
	return ""
}

// likelyPoint mends a naked or a doubled point.
func likelyPoint(s string) string {
	if s == "" {
		return ""
	}
	for _, t := range []string{"0" + s, strings.TrimSuffix(s, "."), strings.Replace(s, "..", ".", 1)} {
		if plainNumber(t) && (t[0] != '0' || s[0] == '.' || s[0] == '0') {
			return t
		}
	}
	return ""
}

// likelyUnit mends the spellings of units that safety lists forbid, part by
// part: "ug/kg/hrs" becomes "microgram/kg/h".
func likelyUnit(unit string) string {
	parts := slashParts(unit)
	for i, p := range parts {
		if !knownPart(p) {
			parts[i] = likelyPart(p)
		}
	}
	return strings.Join(parts, "/")
}

func likelyPart(p string) string {
	if short := strings.TrimSuffix(p, "."); knownPart(short) {
		return short
	}
	switch p {
	case "IU", "iu", "I.U.", "i.u.", "U", "u", "UI", "IE", "Unit", "Units", "UNIT", "UNITS":
		return "units"
	case "cc", "ccm", "cm3", "ML", "Ml", "mls", "mLs", "mils":
		return "mL"
	case "ug", "ugm", "mcgm", "mcgs", "Mcg", "MCG", "gamma", "mikrogram":
		return "microgram"
	case "mgs", "mgm", "mgms", "MG", "Mg":
		return "mg"
	case "gm", "gms", "gs", "G":
		return "g"
	case "ngs", "nanog", "NG":
		return "nanogram"
	case "mmols", "mMol", "mmoles":
		return "mmol"
	case "Kg", "KG", "kgs", "kilo", "kilos", "kilogram", "kilograms":
		return "kg"
	case "H", "hrs", "Hr", "HR", "hours":
		return "h"
	case "Min", "MIN", "minutes":
		return "min"
	case "D", "days", "Day":
		return "day"
	case "m^2", "M2", "sqm", "sq m":
		return "m2"
	case "Cm", "CM", "cms", "centimetre", "centimetres":
		return "cm"
	case "M", "metre", "metres":
		return "m"
	}
	return p
}
