package pump

import (
	"math/big"

	"drawup/dilution/quantity"
)

// Kinds of slip, as pump cards print them.
const (
	MinuteForHour      = "per minute for per hour" // 60 times the flow
	HourForMinute      = "per hour for per minute" // a sixtieth
	TenTimes           = "ten times"               // a decimal point lost
	ATenth             = "a tenth"                 // a decimal point too many
	PoundsForKilograms = "pounds for kilograms"    // the number of pounds entered as kilograms
)

// A SlipReading is the rate that a pump would show after a slip.
type SlipReading struct {
	Kind string
	Rate quantity.FlowRate // half up to the pump's step
}

// Slips lists what the pump would show if a person slipped on the way to the
// rate of the start dose, from its exact flow and then half up to the step.
// Pounds for kilograms is in it only for a dose rate per kilogram; it divides
// by 0.45359237, the kilograms of the international pound. A slip whose rate
// would round to zero is left out: no pump can show it. Errors are those of
// [Flow].
func Slips(start quantity.DoseRate, per Per, c quantity.Concentration, step quantity.FlowRate) ([]SlipReading, error) {
	exact, err := Flow(start, per, c)
	if err != nil {
		return nil, err
	}
	slips := []struct {
		kind   string
		factor *big.Rat
	}{
		{MinuteForHour, big.NewRat(60, 1)},
		{HourForMinute, big.NewRat(1, 60)},
		{TenTimes, big.NewRat(10, 1)},
		{ATenth, big.NewRat(1, 10)},
		{PoundsForKilograms, big.NewRat(100000000, 45359237)},
	}
	var list []SlipReading
	for _, s := range slips {
		if s.kind == PoundsForKilograms && per.basis != quantity.PerKilogram {
			continue
		}
		rate, _, err := exact.Scaled(s.factor).ToStep(step, quantity.HalfUp)
		if err != nil {
			return nil, err
		}
		if rate.Rat().Sign() > 0 {
			list = append(list, SlipReading{Kind: s.kind, Rate: rate})
		}
	}
	return list, nil
}
