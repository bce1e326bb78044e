package quantity

// ParseBodyWeight reads "72 kg". It must be above zero. Pounds, stones and
// grams are refused with the weight in kg that they would be. Errors are
// *SyntaxError.
func ParseBodyWeight(s string) (BodyWeight, error) { return settle(s, readBodyWeight) }

func readBodyWeight(s string) (BodyWeight, error) {
	r, err := cut(s, wantWeight)
	if err != nil {
		return BodyWeight{}, err
	}
	if factor, ok := otherWeights(r.unit); ok {
		return BodyWeight{}, r.fault(WrongUnit, `the unit "`+r.unit+`" is not kg`, inKilograms(r.x.mul(factor), r.unit))
	}
	if r.unit != "kg" {
		return BodyWeight{}, r.unitFault()
	}
	if err := r.positive(); err != nil {
		return BodyWeight{}, err
	}
	return BodyWeight{x: r.x, text: r.text}, nil
}

// inKilograms is the weight w in words: grams in full, pounds and stones to
// 0.1 kg, and under 10 kg to 0.01 kg.
func inKilograms(w exact, unit string) string {
	switch unit {
	case "g", "gram", "grams":
		return w.text() + " kg"
	}
	step := fraction(1, 10)
	if w.cmp(whole(10)) < 0 {
		step = fraction(1, 100)
	}
	rounded, err := w.toStep(step, HalfUp)
	if err != nil {
		return ""
	}
	return rounded.text() + " kg"
}

// otherWeights holds the factors to kg of units that are refused but named.
// The pound is 0.45359237 kg exactly (legal definition of 1959), the stone 14
// pounds.
func otherWeights(unit string) (exact, bool) {
	switch unit {
	case "lb", "lbs", "pound", "pounds":
		return fraction(45359237, 100000000), true
	case "st", "stone", "stones":
		return fraction(45359237*14, 100000000), true
	case "g", "gram", "grams":
		return fraction(1, 1000), true
	}
	return exact{}, false
}

// ParseLength reads a height: "178 cm" or "1.78 m". It must be above zero.
// Errors are *SyntaxError.
func ParseLength(s string) (Length, error) { return settle(s, readLength) }

func readLength(s string) (Length, error) {
	r, err := cut(s, wantHeight)
	if err != nil {
		return Length{}, err
	}
	scale := whole(1)
	switch r.unit {
	case "cm":
	case "m":
		scale = whole(100)
	default:
		return Length{}, r.unitFault()
	}
	if err := r.positive(); err != nil {
		return Length{}, err
	}
	return Length{x: r.x.mul(scale), text: r.text}, nil
}

// ParseSurface reads a surface area: "1.8 m2" or "1.8 m²". It must be above
// zero. Errors are *SyntaxError.
func ParseSurface(s string) (BodySurfaceArea, error) { return settle(s, readSurface) }

func readSurface(s string) (BodySurfaceArea, error) {
	r, err := cut(s, wantSurface)
	if err != nil {
		return BodySurfaceArea{}, err
	}
	if r.unit != "m2" && r.unit != "m²" {
		return BodySurfaceArea{}, r.unitFault()
	}
	if err := r.positive(); err != nil {
		return BodySurfaceArea{}, err
	}
	return BodySurfaceArea{x: r.x, text: r.text}, nil
}
