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
	EmptyText    Fault = "quantity-missing"  // nothing is there
	CommaNumber  Fault = "number-with-comma" // decimal or thousand: open
	BadNumber    Fault = "number-malformed"  // not plain digits with one point
	UnknownUnit  Fault = "unit-unknown"      // missing, or read nowhere
	WrongUnit    Fault = "unit-wrong-kind"   // read elsewhere, does not fit here
	RatioText    Fault = "ratio-strength"    // a ratio that cannot be read
	ZeroOrLess   Fault = "quantity-zero"     // nothing, or less than that
	TooManyDigit Fault = "number-too-long"   // more than 15 characters
)

// Error says what came, what is wanted, why, and what was probably meant.
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

// Error names both kinds and the rule.
func (e *KindError) Error() string {
	return fmt.Sprintf("got a quantity counted by %v, want one counted by %v (rule R4)", e.Got, e.Want)
}

// A BasisError says that a dose per kilogram, per square metre or absolute met
// something of another basis.
type BasisError struct{ Got, Want Basis }

// Error names both bases and the rule.
func (e *BasisError) Error() string {
	return fmt.Sprintf("got a dose that is %v, want one that is %v (rule R3)", e.Got, e.Want)
}

// A NotGivenError says that a quantity is missing where one is needed.
type NotGivenError struct{ What string }

// Error names what is missing.
func (e *NotGivenError) Error() string { return e.What + " not given" }
