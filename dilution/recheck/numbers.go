package recheck

import (
	"errors"
	"math/big"
	"strings"
)

// mostDigits bounds every number that is read, so that no text can make the
// whole numbers of the second route grow without end.
const mostDigits = 24

var (
	errNumber = errors.New("the number is not in the printed number style")
	errTyped  = errors.New("the number cannot be read as typed")
)

// A value is an exact quantity: a pair of whole numbers and the kind they
// count. den is greater than zero. A value that could not be worked out carries
// the reason in lack, and every sum it enters carries the reason on.
type value struct {
	num, den *big.Int
	dim      dim
	lack     string
}

func pair(num, den int64) value {
	return value{num: big.NewInt(num), den: big.NewInt(den)}
}

func whole(n int64) value { return pair(n, 1) }

func lacking(reason string) value { return value{lack: reason} }

// ofKind gives a plain number a kind.
func (a value) ofKind(d dim) value {
	a.dim = d
	return a
}

// bare takes the kind away after making sure that it is the expected one.
func (a value) bare(want dim) value {
	if a.lack != "" {
		return a
	}
	if a.dim != want {
		return lacking("needs a figure in " + want.words() + ", got " + a.dim.words())
	}
	a.dim = dim{}
	return a
}

func (a value) times(b value) value {
	if a.lack != "" {
		return a
	}
	if b.lack != "" {
		return b
	}
	return value{
		num: new(big.Int).Mul(a.num, b.num),
		den: new(big.Int).Mul(a.den, b.den),
		dim: a.dim.with(b.dim, 1),
	}
}

// over multiplies by the upside-down pair; nothing is divided.
func (a value) over(b value) value {
	if a.lack != "" {
		return a
	}
	if b.lack != "" {
		return b
	}
	if b.num.Sign() == 0 {
		return lacking("cannot be worked: a figure that must not be nothing is 0")
	}
	num, den := new(big.Int).Mul(a.num, b.den), new(big.Int).Mul(a.den, b.num)
	if den.Sign() < 0 {
		num.Neg(num)
		den.Neg(den)
	}
	return value{num: num, den: den, dim: a.dim.with(b.dim, -1)}
}

func (a value) plus(b value) value  { return a.joined(b, 1) }
func (a value) minus(b value) value { return a.joined(b, -1) }

func (a value) joined(b value, sign int64) value {
	if a.lack != "" {
		return a
	}
	if b.lack != "" {
		return b
	}
	if a.dim != b.dim {
		return lacking("kinds do not match: " + a.dim.words() + " and " + b.dim.words())
	}
	right := new(big.Int).Mul(b.num, a.den)
	right.Mul(right, big.NewInt(sign))
	left := new(big.Int).Mul(a.num, b.den)
	return value{num: left.Add(left, right), den: new(big.Int).Mul(a.den, b.den), dim: a.dim}
}

// against cross-multiplies: below zero if a is less than b, zero if equal. Both
// must be complete; callers have looked at lack and kind before.
func (a value) against(b value) int {
	return new(big.Int).Mul(a.num, b.den).Cmp(new(big.Int).Mul(b.num, a.den))
}

func (a value) sign() int { return a.num.Sign() }

// isMultiple says whether a is a whole number of steps. It asks only whether a
// remainder is left, never how often the step goes in.
func (a value) isMultiple(step value) bool {
	if step.sign() == 0 {
		return false
	}
	rest := new(big.Int).Rem(new(big.Int).Mul(a.num, step.den), new(big.Int).Mul(a.den, step.num))
	return rest.Sign() == 0
}

// printedNumber reads a number as paper shows it: digits in groups of three
// from 1,000, at most one point with digits on both sides, no trailing zero.
func printedNumber(text string) (value, error) {
	front, back, point := strings.Cut(text, ".")
	if point && (back == "" || !digitsOnly(back) || strings.HasSuffix(back, "0")) {
		return value{}, errNumber
	}
	digits, ok := ungrouped(front)
	if !ok || (len(digits) > 1 && digits[0] == '0') {
		return value{}, errNumber
	}
	return fromDigits(digits, back, errNumber)
}

// typedNumber reads a number as people type it: no groups; trailing zeros pass.
func typedNumber(text string) (value, error) {
	front, back, point := strings.Cut(text, ".")
	if !digitsOnly(front) || (point && !digitsOnly(back)) {
		return value{}, errTyped
	}
	return fromDigits(front, back, errTyped)
}

func fromDigits(front, back string, fault error) (value, error) {
	if len(front)+len(back) > mostDigits {
		return value{}, fault
	}
	num, ok := new(big.Int).SetString(front+back, 10)
	if !ok {
		return value{}, fault
	}
	return value{num: num, den: tens(len(back))}, nil
}

// tens is ten to the power n, n from 0.
func tens(n int) *big.Int {
	return new(big.Int).Exp(big.NewInt(10), big.NewInt(int64(n)), nil)
}

// ungrouped takes the separators out of a whole part; from four digits on they
// must be there, all the same and at every third place.
func ungrouped(text string) (string, bool) {
	for _, mark := range []string{",", "\u202f", "\u00a0"} {
		if !strings.Contains(text, mark) {
			continue
		}
		groups := strings.Split(text, mark)
		for i, g := range groups {
			if !digitsOnly(g) || len(g) > 3 || (i > 0 && len(g) != 3) {
				return "", false
			}
		}
		return strings.Join(groups, ""), true
	}
	return text, digitsOnly(text) && len(text) <= 3
}

func digitsOnly(text string) bool {
	if text == "" {
		return false
	}
	for _, r := range text {
		if r < '0' || r > '9' {
			return false
		}
	}
	return true
}
