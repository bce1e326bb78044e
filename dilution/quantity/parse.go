package quantity

import (
	"math/big"
	"strings"
)

// Examples shown in errors as what is wanted.
const (
	wantAmount        = `an amount such as "4 mg", "500 units" or "8 mmol"`
	wantVolume        = `a volume such as "50 mL"`
	wantConcentration = `a concentration such as "2 mg/mL"`
	wantMix           = `an amount in a volume such as "4 mg in 50 mL"`
	wantDose          = `a dose such as "2 mg", "0.3 mg/kg" or "75 mg/m2"`
	wantDoseRate      = `a dose rate such as "5 mg/h" or "0.1 microgram/kg/min"`
	wantFlowRate      = `a flow rate such as "5.3 mL/h"`
	wantWeight        = `a body weight in kg such as "72 kg"`
	wantHeight        = `a height such as "178 cm"`
	wantSurface       = `a surface area such as "1.8 m2"`
	wantPercent       = `a share such as "10 %"`
)

// clean trims s and refuses an empty text.
func clean(s, want string) (string, error) {
	t := strings.TrimSpace(strings.ReplaceAll(strings.ReplaceAll(s, "\u00a0", " "), "\u202f", " "))
	if t == "" {
		return "", &SyntaxError{Got: s, Want: want, Why: "nothing is there", Code: EmptyText}
	}
	return t, nil
}

// read cuts s into a number and a unit text.
func read(s, want string) (x exact, unit, text string, err error) {
	text, err = clean(s, want)
	if err != nil {
		return exact{}, "", "", err
	}
	number, unit := splitNumber(text)
	if unit == "" && number == text {
		if _, bad := parseNumber(text, number, want); bad == nil {
			return exact{}, "", "", &SyntaxError{Got: s, Want: want, Why: "the unit is missing", Code: UnknownUnit}
		}
	}
	x, err = parseNumber(text, number, want)
	return x, unit, text, err
}

func unitFault(text, unit, want string) error {
	why := `the unit "` + unit + `" is not one of these`
	code := WrongUnit
	if _, known := unitNamed(strings.FieldsFunc(unit+"/", isSlash)[0]); !known && unit != "" {
		code = UnknownUnit
	}
	return &SyntaxError{Got: text, Want: want, Why: why, Likely: likelyUnit(text, unit), Code: code}
}

func isSlash(r rune) bool { return r == '/' }

// likelyUnit mends the unit spellings that safety lists forbid.
func likelyUnit(text, unit string) string {
	for _, w := range [][2]string{{"IU", "units"}, {"iu", "units"}, {"U", "units"}, {"u", "units"}, {"I.U.", "units"},
		{"cc", "mL"}, {"ug", "microgram"}, {"mcgs", "mcg"}, {"mgs", "mg"}, {"mls", "mL"}, {"ML", "mL"}, {"Kg", "kg"}, {"KG", "kg"}, {"kgs", "kg"}} {
		if unit == w[0] || strings.HasPrefix(unit, w[0]+"/") {
			return strings.TrimSuffix(text, unit) + w[1] + strings.TrimPrefix(unit, w[0])
		}
	}
	return ""
}

// ParseAmount reads an amount such as "4 mg", "500 units", "8 mmol".
// It must be above zero. Errors are *SyntaxError.
func ParseAmount(s string) (Amount, error) {
	x, unit, text, err := read(s, wantAmount)
	if err != nil {
		return Amount{}, err
	}
	u, ok := unitNamed(unit)
	if !ok {
		return Amount{}, unitFault(text, unit, wantAmount)
	}
	if err := aboveZero(x, text, wantAmount); err != nil {
		return Amount{}, err
	}
	return Amount{x: x.mul(u.scale), kind: u.kind, unit: u, text: s}, nil
}

func aboveZero(x exact, text, want string) error {
	if x.sign() <= 0 {
		return &SyntaxError{Got: text, Want: want, Why: "it must be more than zero", Code: ZeroOrLess}
	}
	return nil
}

// volumeScale is how many mL a unit of volume holds.
func volumeScale(unit string) (exact, bool) {
	switch unit {
	case "mL", "ml", "millilitre", "millilitres":
		return whole(1), true
	case "L", "l", "litre", "litres":
		return whole(1000), true
	}
	return exact{}, false
}

// ParseVolume reads a volume such as "50 mL" or "1 L". It must be above zero.
func ParseVolume(s string) (Volume, error) {
	x, unit, text, err := read(s, wantVolume)
	if err != nil {
		return Volume{}, err
	}
	scale, ok := volumeScale(unit)
	if !ok {
		return Volume{}, unitFault(text, unit, wantVolume)
	}
	if err := aboveZero(x, text, wantVolume); err != nil {
		return Volume{}, err
	}
	return Volume{x: x.mul(scale), text: s}, nil
}

// ParseMix reads an amount in a final volume: "4 mg in 50 mL".
func ParseMix(s string) (Amount, Volume, error) {
	head, tail, ok := strings.Cut(s, " in ")
	if !ok {
		return Amount{}, Volume{}, &SyntaxError{Got: s, Want: wantMix, Why: `the word "in" is missing`, Code: BadNumber}
	}
	a, err := ParseAmount(head)
	if err != nil {
		return Amount{}, Volume{}, err
	}
	v, err := ParseVolume(tail)
	return a, v, err
}

// ParseConcentration reads "2 mg/mL", "400 mg/L", "4 mg in 50 mL", and, on
// input only, per cent ("0.5 %" is 5 mg/mL) and ratio strengths ("1:1000" or
// "1 in 1,000" is 1 mg/mL); calculation.md a2. It must be above zero.
func ParseConcentration(s string) (Concentration, error) {
	text, err := clean(s, wantConcentration)
	if err != nil {
		return Concentration{}, err
	}
	if c, ok, err := parseRatio(s, text); ok {
		return c, err
	}
	if strings.Contains(text, " in ") {
		a, v, err := ParseMix(text)
		if err != nil {
			return Concentration{}, err
		}
		c, err := a.In(v)
		c.text = s
		return c, err
	}
	x, unit, text, err := read(s, wantConcentration)
	if err != nil {
		return Concentration{}, err
	}
	if err := aboveZero(x, text, wantConcentration); err != nil {
		return Concentration{}, err
	}
	if unit == "%" || unit == "% w/v" {
		return Concentration{x: x.mul(whole(10)), kind: ByMass, unit: Milligram(), text: s}, nil
	}
	return concentrationIn(x, unit, text, s)
}

func concentrationIn(x exact, unit, text, s string) (Concentration, error) {
	unit = strings.Replace(unit, " per ", "/", 1)
	per, vol, ok := strings.Cut(unit, "/")
	u, known := unitNamed(strings.TrimSpace(per))
	if !ok || !known {
		return Concentration{}, unitFault(text, unit, wantConcentration)
	}
	share := whole(1)
	if n, rest := splitNumber(strings.TrimSpace(vol)); n != "" {
		d, err := parseNumber(text, n, wantConcentration)
		if err != nil || d.sign() <= 0 {
			return Concentration{}, unitFault(text, unit, wantConcentration)
		}
		share, vol = d, rest
	}
	scale, ok := volumeScale(strings.TrimSpace(vol))
	if !ok {
		return Concentration{}, unitFault(text, unit, wantConcentration)
	}
	return Concentration{x: x.mul(u.scale).quo(scale.mul(share)), kind: u.kind, unit: u, text: s}, nil
}

// parseRatio reads "1:N" and "1 in N", N at least 10, as 1 g in N mL.
func parseRatio(s, text string) (Concentration, bool, error) {
	var tail string
	switch {
	case strings.HasPrefix(text, "1:"):
		tail = text[2:]
	case strings.HasPrefix(text, "1 in "):
		tail = text[5:]
	default:
		return Concentration{}, false, nil
	}
	digits := strings.NewReplacer(",", "", " ", "").Replace(strings.TrimSpace(tail))
	if !allDigits(digits) {
		return Concentration{}, false, nil
	}
	if len(digits) < 2 || len(digits) > 9 || digits[0] == '0' {
		return Concentration{}, true, &SyntaxError{Got: s, Want: wantConcentration, Why: "a ratio must be 1 in 10 or more", Code: RatioText}
	}
	n, _ := new(big.Rat).SetString(digits)
	return Concentration{x: whole(1000).quo(exact{r: n}), kind: ByMass, unit: Milligram(), text: s}, true, nil
}

// basisOf reads the "/kg" or "/m2" of a dose and returns what follows.
func basisOf(parts []string) (Basis, []string) {
	if len(parts) == 0 {
		return Absolute, parts
	}
	switch parts[0] {
	case "kg":
		return PerKilogram, parts[1:]
	case "m2", "m²":
		return PerSquareMetre, parts[1:]
	}
	return Absolute, parts
}

func slashParts(unit string) []string {
	parts := strings.Split(strings.ReplaceAll(unit, " per ", "/"), "/")
	for i := range parts {
		parts[i] = strings.TrimSpace(parts[i])
	}
	return parts
}

// ParseDose reads "2 mg", "0.3 mg/kg" or "75 mg/m2". It must be above zero.
func ParseDose(s string) (Dose, error) {
	x, unit, text, err := read(s, wantDose)
	if err != nil {
		return Dose{}, err
	}
	parts := slashParts(unit)
	u, ok := unitNamed(parts[0])
	basis, rest := basisOf(parts[1:])
	if !ok || len(rest) != 0 {
		return Dose{}, unitFault(text, unit, wantDose)
	}
	if err := aboveZero(x, text, wantDose); err != nil {
		return Dose{}, err
	}
	return Dose{x: x.mul(u.scale), kind: u.kind, basis: basis, unit: u, text: s}, nil
}

// ParseDoseRate reads "5 mg/h", "0.1 microgram/kg/min", "2 g/m2/day".
// It must be above zero.
func ParseDoseRate(s string) (DoseRate, error) {
	x, unit, text, err := read(s, wantDoseRate)
	if err != nil {
		return DoseRate{}, err
	}
	parts := slashParts(unit)
	u, ok := unitNamed(parts[0])
	basis, rest := basisOf(parts[1:])
	if !ok || len(rest) != 1 {
		return DoseRate{}, unitFault(text, unit, wantDoseRate)
	}
	period, ok := periodNamed(rest[0])
	if !ok {
		return DoseRate{}, unitFault(text, unit, wantDoseRate)
	}
	if err := aboveZero(x, text, wantDoseRate); err != nil {
		return DoseRate{}, err
	}
	return DoseRate{x: x.mul(u.scale).mul(period.perHour()), kind: u.kind, basis: basis, unit: u, period: period, text: s}, nil
}

// ParseFlowRate reads "5.3 mL/h", "0.5 mL/min", "1 L/day". It must be above zero.
func ParseFlowRate(s string) (FlowRate, error) {
	x, unit, text, err := read(s, wantFlowRate)
	if err != nil {
		return FlowRate{}, err
	}
	vol, per, _ := strings.Cut(strings.ReplaceAll(unit, " per ", "/"), "/")
	scale, ok := volumeScale(vol)
	period, okp := periodNamed(per)
	if !ok || !okp {
		return FlowRate{}, unitFault(text, unit, wantFlowRate)
	}
	if err := aboveZero(x, text, wantFlowRate); err != nil {
		return FlowRate{}, err
	}
	return FlowRate{x: x.mul(scale).mul(period.perHour()), text: s}, nil
}

// ParseBodyWeight reads "72 kg". Pounds and stones are refused with the weight
// in kg that they would be.
func ParseBodyWeight(s string) (BodyWeight, error) {
	x, unit, text, err := read(s, wantWeight)
	if err != nil {
		return BodyWeight{}, err
	}
	if unit != "kg" {
		e := &SyntaxError{Got: text, Want: wantWeight, Why: `the unit "` + unit + `" is not kg`, Likely: likelyUnit(text, unit), Code: WrongUnit}
		if f, ok := otherWeights(unit); ok {
			rounded, _ := x.mul(f).toStep(fraction(1, 10), HalfUp)
			e.Likely = rounded.text() + " kg"
		}
		return BodyWeight{}, e
	}
	if err := aboveZero(x, text, wantWeight); err != nil {
		return BodyWeight{}, err
	}
	return BodyWeight{x: x, text: s}, nil
}

// otherWeights holds the factors to kg of units that are refused but named:
// the pound is 0.45359237 kg exactly (calculation.md a1).
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

// ParseLength reads a height: "178 cm" or "1.78 m".
func ParseLength(s string) (Length, error) {
	x, unit, text, err := read(s, wantHeight)
	if err != nil {
		return Length{}, err
	}
	switch unit {
	case "cm":
	case "m":
		x = x.mul(whole(100))
	default:
		return Length{}, unitFault(text, unit, wantHeight)
	}
	if err := aboveZero(x, text, wantHeight); err != nil {
		return Length{}, err
	}
	return Length{x: x, text: s}, nil
}

// ParseSurface reads a surface area: "1.8 m2" or "1.8 m²".
func ParseSurface(s string) (BodySurfaceArea, error) {
	x, unit, text, err := read(s, wantSurface)
	if err != nil {
		return BodySurfaceArea{}, err
	}
	if unit != "m2" && unit != "m²" {
		return BodySurfaceArea{}, unitFault(text, unit, wantSurface)
	}
	if err := aboveZero(x, text, wantSurface); err != nil {
		return BodySurfaceArea{}, err
	}
	return BodySurfaceArea{x: x, text: s}, nil
}

// ParsePercent reads "10 %" or "10%".
func ParsePercent(s string) (Percent, error) {
	x, unit, text, err := read(s, wantPercent)
	if err != nil {
		return Percent{}, err
	}
	if unit != "%" {
		return Percent{}, unitFault(text, unit, wantPercent)
	}
	return Percent{x: x, text: s}, nil
}
