package quantity

import (
	"math/big"
	"strings"
	"unicode"
	"unicode/utf8"
)

// maxNumber is the longest number that is read, in characters.
const maxNumber = 15

// splitNumber cuts the leading number from s. What follows is the unit.
func splitNumber(s string) (number, rest string) {
	for i, r := range s {
		if !isNumberRune(r, s[i:]) {
			return s[:i], strings.TrimLeft(s[i:], " ")
		}
	}
	return s, ""
}

// isNumberRune also takes in the characters of wrong numbers, so that they
// are refused as a whole and not half read. from is the text from r on.
func isNumberRune(r rune, from string) bool {
	switch {
	case unicode.IsDigit(r) || unicode.In(r, unicode.No, unicode.Nl):
		return true
	case strings.ContainsRune(".,'_+"+dashes, r):
		return true
	case r == 'e' || r == 'E' || r == 'x':
		next, _ := utf8.DecodeRuneInString(from[1:])
		return unicode.IsDigit(next) || next == '+' || next == '-'
	}
	return false
}

// dashes are the characters that stand for "minus" or "to".
const dashes = "-\u2010\u2011\u2012\u2013\u2014\u2212"

// goesOn reports that what follows a number is more of a number: "1 000 mg",
// "1 1/2 mL", "1/2 mL". from is the text behind the number, blanks cut.
func goesOn(from string) bool {
	from = strings.TrimPrefix(from, "/")
	r, _ := utf8.DecodeRuneInString(from)
	return from != "" && isNumberRune(r, from)
}

// readNumber reads digits with at most one point that has digits on both
// sides. Zero is allowed; callers refuse it where it means nothing. A number
// that does not read gives its fault and why.
func readNumber(number string) (x exact, code Fault, why string) {
	switch {
	case number == "":
		return exact{}, BadNumber, "there is no number in front"
	case utf8.RuneCountInString(number) > maxNumber:
		return exact{}, TooManyDigit, "the number is longer than 15 characters"
	case strings.Contains(number, ","):
		return exact{}, CommaNumber, "a comma can mean a decimal or a thousand"
	case strings.ContainsAny(number, "+"+dashes):
		return exact{}, BadNumber, "a sign or a range is not a plain number"
	case len(number) > 1 && number[0] == '0' && number[1] != '.':
		return exact{}, BadNumber, "a number that begins with 0 may have lost its point"
	case !plainNumber(number):
		return exact{}, BadNumber, "the number is not plain digits with at most one point between digits"
	}
	r, ok := new(big.Rat).SetString(number)
	if !ok {
		return exact{}, BadNumber, "the number cannot be read"
	}
	return exact{r: r}, "", ""
}

// plainNumber is the strict pattern of rule R1: 0, 12, 0.5, 12.25.
func plainNumber(s string) bool {
	head, tail, point := strings.Cut(s, ".")
	if !allDigits(head) || (len(head) > 1 && head[0] == '0') {
		return false
	}
	return !point || allDigits(tail)
}

func allDigits(s string) bool {
	for i := 0; i < len(s); i++ {
		if s[i] < '0' || s[i] > '9' {
			return false
		}
	}
	return s != ""
}

// ungroup joins digits set off in threes by mark: "12'500", "1,000.5". Decimals
// may follow if mark is no point. What it joins must be a plain number.
func ungroup(s, mark string) (string, bool) {
	tail := ""
	if mark != "." {
		var point bool
		if s, tail, point = strings.Cut(s, "."); point {
			tail = "." + tail
		}
	}
	groups := strings.Split(s, mark)
	for i, g := range groups {
		if !allDigits(g) || len(g) > 3 || (i > 0 && len(g) != 3) {
			return "", false
		}
	}
	joined := strings.Join(groups, "") + tail
	return joined, len(groups) > 1 && plainNumber(joined)
}
