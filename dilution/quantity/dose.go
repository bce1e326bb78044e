package quantity

// ParseDose reads "2 mg", "0.3 mg/kg" or "75 mg/m2". It must be above zero.
// Errors are *SyntaxError.
func ParseDose(s string) (Dose, error) { return settle(s, readDose) }

func readDose(s string) (Dose, error) {
	r, err := cut(s, wantDose)
	if err != nil {
		return Dose{}, err
	}
	u, basis, rest, ok := doseParts(r.unit)
	if !ok || len(rest) != 0 {
		return Dose{}, r.unitFault()
	}
	if err := r.positive(); err != nil {
		return Dose{}, err
	}
	return Dose{x: r.x.mul(u.scale), kind: u.kind, basis: basis, unit: u, text: r.text}, nil
}

// ParseDoseRate reads "5 mg/h", "0.1 microgram/kg/min", "2 g/m2/day". It must
// be above zero. Errors are *SyntaxError.
func ParseDoseRate(s string) (DoseRate, error) { return settle(s, readDoseRate) }

func readDoseRate(s string) (DoseRate, error) {
	r, err := cut(s, wantDoseRate)
	if err != nil {
		return DoseRate{}, err
	}
	u, basis, rest, ok := doseParts(r.unit)
	if !ok || len(rest) != 1 {
		return DoseRate{}, r.unitFault()
	}
	period, ok := periodNamed(rest[0])
	if !ok {
		return DoseRate{}, r.unitFault()
	}
	if err := r.positive(); err != nil {
		return DoseRate{}, err
	}
	return DoseRate{x: r.x.mul(u.scale).mul(period.perHour()), kind: u.kind, basis: basis, unit: u, period: period, text: r.text}, nil
}

// doseParts reads the unit of amount and what the dose is counted per; rest is
// what follows. ok is false for an unknown unit of amount.
func doseParts(unit string) (u Unit, basis Basis, rest []string, ok bool) {
	parts := slashParts(unit)
	u, ok = unitNamed(parts[0])
	basis, rest = Absolute, parts[1:]
	if len(rest) == 0 {
		return u, basis, rest, ok
	}
	switch rest[0] {
	case "kg":
		return u, PerKilogram, rest[1:], ok
	case "m2", "m²":
		return u, PerSquareMetre, rest[1:], ok
	}
	return u, basis, rest, ok
}
