package pump

import (
	"fmt"
	"math/big"

	"drawup/dilution/quantity"
)

// A Setting is one dose rate as the pump can give it.
type Setting struct {
	Dose        quantity.DoseRate // wanted
	Exact       quantity.FlowRate // that gives exactly Dose
	Rate        quantity.FlowRate // on the pump's step
	LostPercent *big.Rat          // Rate minus Exact, in per cent of Exact
	Delivered   quantity.DoseRate // what Rate gives, in the unit of Dose
}

// BelowStep says that a flow rate is too small for the pump's step: it would
// be rounded to nothing.
type BelowStep struct{ Exact, Step quantity.FlowRate }

// Error says what was got and what is wanted.
func (e *BelowStep) Error() string {
	return fmt.Sprintf("got %s mL/h, want a rate that does not round to zero on steps of %s mL/h", e.Exact.Exact(), e.Step.Exact())
}

// Set rounds the flow rate of dose half up to the pump's step (rule R2). Errors
// are those of [Flow], and *BelowStep.
func Set(dose quantity.DoseRate, per Per, c quantity.Concentration, step quantity.FlowRate) (Setting, error) {
	return set(dose, per, c, step, quantity.HalfUp)
}

// SetNotAbove rounds down, so that an upper limit is not passed. Errors are
// those of [Set].
func SetNotAbove(dose quantity.DoseRate, per Per, c quantity.Concentration, step quantity.FlowRate) (Setting, error) {
	return set(dose, per, c, step, quantity.Down)
}

// SetNotBelow rounds up, so that a lower limit is kept. Errors are those of
// [Flow].
func SetNotBelow(dose quantity.DoseRate, per Per, c quantity.Concentration, step quantity.FlowRate) (Setting, error) {
	return set(dose, per, c, step, quantity.Up)
}

func set(dose quantity.DoseRate, per Per, c quantity.Concentration, step quantity.FlowRate, d quantity.Direction) (Setting, error) {
	exact, err := Flow(dose, per, c)
	if err != nil {
		return Setting{}, err
	}
	rate, lost, err := exact.ToStep(step, d)
	if err != nil {
		return Setting{}, err
	}
	if rate.Rat().Sign() <= 0 {
		return Setting{}, &BelowStep{Exact: exact, Step: step}
	}
	given, err := Delivered(rate, per, c, dose)
	if err != nil {
		return Setting{}, err
	}
	return Setting{Dose: dose, Exact: exact, Rate: rate, LostPercent: lost, Delivered: given}, nil
}
