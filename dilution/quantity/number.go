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
			return s[:i], strings.TrimLeft(s[i:], " \u00a0\u202f")
		}
	}
	return s, ""
}

// isNumberRune also takes in the characters of wrong numbers, so that they
// are refused as a whole and not half read.
func isNumberRune(r rune, from string) bool {
	switch {
	case unicode.IsDigit(r) || unicode.In(r, unicode.No, unicode.Nl):
		return true
	case strings.ContainsRune(".,+-\u2212\u2013'_", r):
		return true
	case r == 'e' || r == 'E' || r == 'x':
		next, _ := utf8.DecodeRuneInString(from[1:])
		return unicode.IsDigit(next) || next == '+' || next == '-'
	}
	return false
}

// parseNumber reads digits with at most one point that has digits on both
// sides. Zero is allowed; callers refuse it where it means nothing.
func parseNumber(whole, number, want string) (exact, error) {
	fault := func(code Fault, why, likely string) (exact, error) {
		if likely != "" {
			likely = strings.Replace(whole, number, likely, 1)
		}
		return exact{}, &SyntaxError{Got: whole, Want: want, Why: why, Likely: likely, Code: code}
	}
	switch {
	case number == "":
		return fault(BadNumber, "there is no number", "")
	case len(number) > maxNumber:
		return fault(TooManyDigit, "the number is longer than 15 characters", "")
	case strings.Contains(number, ","):
		return fault(CommaNumber, "a comma can mean a decimal or a thousand", likelyComma(number))
	case !plainNumber(number):
		return fault(BadNumber, "the number is not plain digits with at most one point between digits", likelyNumber(number))
	}
	r, ok := new(big.Rat).SetString(number)
	if !ok {
		return fault(BadNumber, "the number cannot be read", "")
	}
	return exact{r: r}, nil
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

// likelyComma says what a number with a comma probably meant.
func likelyComma(s string) string {
	head, tail, _ := strings.Cut(s, ",")
	if !allDigits(head) {
		return ""
	}
	if len(tail) == 3 && allDigits(tail) {
		return head + tail
	}
	if allDigits(tail) {
		return head + "." + tail
	}
	return ""
}

var fractionsInWords = map[string]string{"½": "0.5", "¼": "0.25", "¾": "0.75", "⅛": "0.125", "⅕": "0.2"}

// likelyNumber says what a malformed number probably meant.
func likelyNumber(s string) string {
	if words, ok := fractionsInWords[s]; ok {
		return words
	}
	t := strings.Trim(s, "+-\u2212\u2013_'")
	switch {
	case plainNumber(t):
		return t
	case strings.HasPrefix(t, ".") && plainNumber("0"+t):
		return "0" + t
	case strings.HasSuffix(t, ".") && plainNumber(strings.TrimSuffix(t, ".")):
		return strings.TrimSuffix(t, ".")
	}
	return likelyExponent(t)
}

func likelyExponent(s string) string {
	i := strings.IndexAny(s, "eE")
	if i < 0 || !plainNumber(s[:i]) || len(s)-i > 3 {
		return ""
	}
	r, ok := new(big.Rat).SetString(s)
	if !ok {
		return ""
	}
	text, ok := exact{r: r}.decimal()
	if !ok {
		return ""
	}
	return text
}
