package pump

import (
	"math/big"

	"drawup/dilution/quantity"
)

// mostRate is the highest rate, in mL/h, that pumps in common use can be set
// to. Common practice, no source.
const mostRate = 1200

// Beyond reports a rate that no pump in common use can be set to.
func Beyond(f quantity.FlowRate) bool {
	return f.Given() && f.Rat().Cmp(big.NewRat(mostRate, 1)) > 0
}
