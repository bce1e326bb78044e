package body

import "strings"

// A Kind says what a dose goes by. The zero value means "not given".
type Kind int

// Kinds of weight, the surface area, and nothing (an absolute dose).
const (
	Actual Kind = iota + 1
	Ideal
	Adjusted
	Lean
	Surface
	None
)

// String is the kind as printed and as orders and formularies write it; "" if
// not given.
func (k Kind) String() string {
	switch k {
	case Actual:
		return "actual"
	case Ideal:
		return "ideal"
	case Adjusted:
		return "adjusted"
	case Lean:
		return "lean"
	case Surface:
		return "surface"
	case None:
		return "none"
	}
	return ""
}

// KindNamed reads actual, total, ideal, adjusted, lean, surface, none in any
// letter case. Total is another word for actual.
func KindNamed(s string) (Kind, bool) {
	switch strings.ToLower(strings.TrimSpace(s)) {
	case "actual", "total":
		return Actual, true
	case "ideal":
		return Ideal, true
	case "adjusted":
		return Adjusted, true
	case "lean":
		return Lean, true
	case "surface":
		return Surface, true
	case "none":
		return None, true
	}
	return 0, false
}

// Equation is how the figure of this kind was worked, as sheets print it: "lean
// weight (Janmahasatian 2005)"; "" where nothing is worked.
func (k Kind) Equation() string {
	switch k {
	case Ideal:
		return devine
	case Adjusted:
		return adjusted
	case Lean:
		return janmahasatian
	case Surface:
		return mostellerArea
	case Actual, None:
		return ""
	}
	return ""
}
