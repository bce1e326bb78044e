package quantity

import "math/big"

// A FlowPerKilogram is volume per time for each kilogram of body weight, as
// fluids and feeds are ordered. It is a type of its own, so that a flow for each
// kilogram never runs as a flow (rule R3).
type FlowPerKilogram struct {
	x    exact // in mL/h for each kg
	text string
}

const wantFlowPerKilogram = `a flow rate for each kg such as "2 mL/kg/h"`

// ParseFlowPerKilogram reads "2 mL/kg/h" or "0.01 mL/kg/min". It must be above
// zero. Errors are *SyntaxError.
func ParseFlowPerKilogram(s string) (FlowPerKilogram, error) {
	return settle(s, readFlowPerKilogram)
}

func readFlowPerKilogram(s string) (FlowPerKilogram, error) {
	r, err := cut(s, wantFlowPerKilogram)
	if err != nil {
		return FlowPerKilogram{}, err
	}
	parts := slashParts(r.unit)
	scale, ok := volumeScale(parts[0])
	if ok && len(parts) == 3 && parts[2] == "kg" { // mL/min/kg, in the other order
		return FlowPerKilogram{}, r.fault(WrongUnit, "the kg stands before the time",
			r.number+" "+parts[0]+"/kg/"+parts[1])
	}
	if !ok || len(parts) != 3 || parts[1] != "kg" {
		return FlowPerKilogram{}, r.unitFault()
	}
	period, ok := periodNamed(parts[2])
	if !ok {
		return FlowPerKilogram{}, r.unitFault()
	}
	if err := r.positive(); err != nil {
		return FlowPerKilogram{}, err
	}
	return FlowPerKilogram{x: r.x.mul(scale).mul(period.perHour()), text: r.text}, nil
}

// Given reports whether there is a flow at all.
func (f FlowPerKilogram) Given() bool { return f.x.given() }

// Rat is a copy of the exact value in mL/h for each kg; nil if nothing is given.
func (f FlowPerKilogram) Rat() *big.Rat { return f.x.copyRat() }

// Written is the text that the flow was read from, blanks put in order.
func (f FlowPerKilogram) Written() string { return f.text }

// For is the flow rate of a patient of weight w. Error: *NotGivenError.
func (f FlowPerKilogram) For(w BodyWeight) (FlowRate, error) {
	if !f.Given() || !w.x.positive() {
		return FlowRate{}, &NotGivenError{What: "flow rate for each kg, or body weight"}
	}
	return FlowRate{x: f.x.mul(w.x)}, nil
}
