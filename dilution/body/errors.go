package body

import "fmt"

// A Value names what an equation needs to know.
type Value string

// Values that an equation may need.
const (
	NeedSex    Value = "sex"
	NeedAge    Value = "age"
	NeedHeight Value = "height"
	NeedWeight Value = "weight"
)

// A MissingError says which value an equation needs and has not got.
type MissingError struct {
	Equation string // "ideal weight (Devine 1974)"
	What     Value
}

// Error says what was got and what is wanted.
func (e *MissingError) Error() string {
	return fmt.Sprintf("got no %s, want one for the %s", e.What, e.Equation)
}

// An OutsideEquation says that an equation does not hold for this person, why,
// and who says so. Callers refuse it as body-size-outside-equation.
type OutsideEquation struct {
	Equation string
	Reason   string
	Source   string
}

// Error says what was got and what is wanted.
func (e *OutsideEquation) Error() string { return e.Equation + ": " + e.Reason }

// A NotAWeightError says that a weight was asked of a kind that is none.
type NotAWeightError struct{ Kind Kind }

// Error says what was got and what is wanted.
func (e *NotAWeightError) Error() string {
	return fmt.Sprintf("got %q, want actual, ideal, adjusted or lean weight", e.Kind)
}
