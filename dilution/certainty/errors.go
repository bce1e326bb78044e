package certainty

import (
	"fmt"
	"math/big"

	"drawup/dilution/quantity"
)

// A PreparationError says what in a preparation cannot be.
type PreparationError struct {
	Where, Got, Want string
}

// Error says what was got and what is wanted.
func (e *PreparationError) Error() string {
	return fmt.Sprintf("%s: got %s, want %s", e.Where, e.Got, e.Want)
}

func wrong(where fmt.Stringer, got, want string) error {
	return &PreparationError{Where: where.String(), Got: got, Want: want}
}

func missing(what string) error { return &quantity.NotGivenError{What: what} }

// text is v in mL for errors.
func text(v quantity.Volume) string {
	if !v.Given() {
		return "no volume"
	}
	return v.Exact() + " mL"
}

// exactly is r mL for errors.
func exactly(r *big.Rat) string { return text(quantity.Millilitres(r)) }
