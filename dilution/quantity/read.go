package quantity

import "strings"

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

// A reading is a text cut into its number and its unit.
type reading struct {
	got    string // as given
	text   string // blanks put in order
	want   string
	number string
	unit   string
	x      exact
}

// clean puts blanks of every sort and length in order: single, none outside.
func clean(s string) string { return strings.Join(strings.Fields(s), " ") }

// cut splits s into a plain number and the text of a unit, neither empty.
func cut(s, want string) (reading, error) {
	r := reading{got: s, text: clean(s), want: want}
	if r.text == "" {
		return r, r.fault(EmptyText, "nothing is there", "")
	}
	r.number, r.unit = splitNumber(r.text)
	if r.number != "" && goesOn(r.unit) {
		return r, r.brokenNumber()
	}
	x, code, why := readNumber(r.number)
	if why != "" {
		return r, r.fault(code, why, r.meant())
	}
	if r.unit == "" {
		return r, r.fault(UnknownUnit, "the unit is missing", "")
	}
	r.x = x
	return r, nil
}

func (r reading) fault(code Fault, why, likely string) error {
	return &SyntaxError{Got: r.got, Want: r.want, Why: why, Likely: likely, Code: code}
}

// meant is the text with its number and its unit mended; "" if the number is
// open, and if there is nothing to mend.
func (r reading) meant() string {
	number, unit := likelyNumber(r.number), likelyUnit(r.unit)
	if number == "" || (number == r.number && unit == r.unit) {
		return ""
	}
	return number + " " + unit
}

// brokenNumber refuses a number that a blank or a stroke cuts in two.
func (r reading) brokenNumber() error {
	all := r.text
	end := len(all)
	for i, c := range all {
		if c != ' ' && c != '/' && !isNumberRune(c, all[i:]) {
			end = i
			break
		}
	}
	r.number, r.unit = strings.TrimSpace(all[:end]), all[end:]
	return r.fault(BadNumber, "the number is in two parts", r.meant())
}

// positive refuses zero.
func (r reading) positive() error {
	if !r.x.positive() {
		return r.fault(ZeroOrLess, "it must be more than zero", "")
	}
	return nil
}

// unitFault refuses the unit: WrongUnit if every part of it is known but does
// not fit, else UnknownUnit.
func (r reading) unitFault() error {
	switch {
	case strings.HasPrefix(r.unit, ":"):
		return r.fault(RatioText, "a ratio is read only as a concentration, and only from 1 in 10 on", "")
	case strings.HasPrefix(r.unit, "%"):
		return r.fault(WrongUnit, `"`+r.unit+`" does not fit here`, "")
	}
	for _, p := range slashParts(r.unit) {
		if !knownPart(p) {
			return r.fault(UnknownUnit, `the unit "`+r.unit+`" is not known`, r.meant())
		}
	}
	return r.fault(WrongUnit, `the unit "`+r.unit+`" does not fit here`, "")
}

// slashParts cuts "mg per kg / min" at its strokes; the word "per" is one.
func slashParts(unit string) []string {
	parts := strings.Split(strings.ReplaceAll(unit, " per ", "/"), "/")
	for i := range parts {
		parts[i] = strings.TrimSpace(parts[i])
	}
	return parts
}

// knownPart reports a unit that is read somewhere, be it not here.
func knownPart(p string) bool {
	if _, ok := unitNamed(p); ok {
		return true
	}
	if _, ok := volumeScale(p); ok {
		return true
	}
	if _, ok := periodNamed(p); ok {
		return true
	}
	if _, ok := otherWeights(p); ok {
		return true
	}
	switch p {
	case "kg", "m2", "m²", "m", "cm", "%", "per cent", "percent":
		return true
	}
	return false
}
