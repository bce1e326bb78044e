package quantity

import "fmt"

// A SyntaxError says that a text is not a quantity of the wanted sort.
// Likely, if not empty, is the reading that was probably meant.
type SyntaxError struct {
	Got    string // the text as given
	Want   string // what a right text looks like
	Why    string // what is wrong with it
	Likely string // what was probably meant, or ""
	// Code tells callers apart what to refuse: one of the Fault constants.
	Code Fault
}

// A Fault names what is wrong with a text.
type Fault string

// Faults of a text. The values are used as refusal codes by callers.
const (
	EmptyText    Fault = "quantity-missing"
	CommaNumber  Fault = "number-with-comma"
	BadNumber    Fault = "number-malformed"
	UnknownUnit  Fault = "unit-unknown"
	WrongUnit    Fault = "unit-wrong-kind"
	RatioText    Fault = "ratio-strength"
	ZeroOrLess   Fault = "quantity-zero"
	TooManyDigit Fault = "number-too-long"
)

func (e *SyntaxError) Error() string {
	s := fmt.Sprintf("got %q, want %s: %s", e.Got, e.Want, e.Why)
	if e.Likely != "" {
		s += fmt.Sprintf("; was %q meant?", e.Likely)
	}
	return s
}

// A KindError says that two ways of counting a drug met: mass, activity and
// amount of substance never convert into each other (rule R4).
type KindError struct{ Got, Want Kind }

func (e *KindError) Error() string {
	return fmt.Sprintf("got a quantity counted by %v, want one counted by %v (rule R4)", e.Got, e.Want)
}

// A BasisError says that a dose per kilogram, per square metre or absolute met
// something of another basis.
type BasisError struct{ Got, Want Basis }

func (e *BasisError) Error() string {
	return fmt.Sprintf("got a dose that is %v, want one that is %v (rule R3)", e.Got, e.Want)
}

// A NotGivenError says that a quantity is missing where one is needed.
type NotGivenError struct{ What string }

func (e *NotGivenError) Error() string { return e.What + " not given" }
