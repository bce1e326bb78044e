package quantity

import "strings"

// ParseAmount reads an amount such as "4 mg", "500 units", "8 mmol". It must be
// above zero. Errors are *SyntaxError.
func ParseAmount(s string) (Amount, error) { return settle(s, readAmount) }

func readAmount(s string) (Amount, error) {
	r, err := cut(s, wantAmount)
	if err != nil {
		return Amount{}, err
	}
	u, ok := unitNamed(r.unit)
	if !ok {
		return Amount{}, r.unitFault()
	}
	if err := r.positive(); err != nil {
		return Amount{}, err
	}
	return Amount{x: r.x.mul(u.scale), kind: u.kind, unit: u, text: r.text}, nil
}

// ParseVolume reads a volume such as "50 mL" or "1 L". It must be above zero.
// Errors are *SyntaxError.
func ParseVolume(s string) (Volume, error) { return settle(s, readVolume) }

func readVolume(s string) (Volume, error) {
	r, err := cut(s, wantVolume)
	if err != nil {
		return Volume{}, err
	}
	scale, ok := volumeScale(r.unit)
	if !ok {
		return Volume{}, r.unitFault()
	}
	if err := r.positive(); err != nil {
		return Volume{}, err
	}
	return Volume{x: r.x.mul(scale), text: r.text}, nil
}

// ParseMix reads an amount in a final volume: "4 mg in 50 mL". Both must be
// above zero. Errors are *SyntaxError for the whole text.
func ParseMix(s string) (Amount, Volume, error) {
	m, err := settle(s, readMix)
	return m.amount, m.volume, err
}

type mix struct {
	amount Amount
	volume Volume
}

func readMix(s string) (mix, error) {
	text := clean(s)
	if text == "" {
		return mix{}, &SyntaxError{Got: s, Want: wantMix, Why: "nothing is there", Code: EmptyText}
	}
	head, tail, ok := strings.Cut(text, " in ")
	if !ok {
		return mix{}, &SyntaxError{Got: s, Want: wantMix, Why: `the word "in" is missing`, Code: BadNumber}
	}
	a, errA := readAmount(head)
	v, errV := readVolume(tail)
	if errA == nil && errV == nil {
		return mix{a, v}, nil
	}
	return mix{}, mixFault(s, head, tail, errA, errV)
}

// mixFault tells the first fault of the two parts, and mends both.
func mixFault(s, head, tail string, errA, errV error) error {
	left, first := mended(head, errA)
	right, second := mended(tail, errV)
	if first == nil {
		first = second
	}
	e := &SyntaxError{Got: s, Want: wantMix, Why: first.Why, Code: first.Code}
	if left != "" && right != "" {
		e.Likely = left + " in " + right
	}
	return e
}

// mended is the part as it was probably meant, and its fault, if any.
func mended(part string, err error) (string, *SyntaxError) {
	if fault, ok := err.(*SyntaxError); ok {
		return fault.Likely, fault
	}
	number, unit := splitNumber(part)
	return trimZeros(number) + " " + unit, nil
}

// ParseFlowRate reads "5.3 mL/h", "0.5 mL/min", "1 L/day". It must be above
// zero. Errors are *SyntaxError.
func ParseFlowRate(s string) (FlowRate, error) { return settle(s, readFlowRate) }

func readFlowRate(s string) (FlowRate, error) {
	r, err := cut(s, wantFlowRate)
	if err != nil {
		return FlowRate{}, err
	}
	parts := slashParts(r.unit)
	scale, ok := volumeScale(parts[0])
	if !ok || len(parts) != 2 {
		return FlowRate{}, r.unitFault()
	}
	period, ok := periodNamed(parts[1])
	if !ok {
		return FlowRate{}, r.unitFault()
	}
	if err := r.positive(); err != nil {
		return FlowRate{}, err
	}
	return FlowRate{x: r.x.mul(scale).mul(period.perHour()), text: r.text}, nil
}

// ParsePercent reads a relative width: "10 %" or "10%". Zero is a width too.
// Errors are *SyntaxError.
func ParsePercent(s string) (Percent, error) { return settle(s, readPercent) }

func readPercent(s string) (Percent, error) {
	r, err := cut(s, wantPercent)
	if err != nil {
		return Percent{}, err
	}
	if !isPercent(r.unit) {
		return Percent{}, r.unitFault()
	}
	return Percent{x: r.x, text: r.text}, nil
}

func isPercent(unit string) bool {
	return unit == "%" || unit == "per cent" || unit == "percent"
}
