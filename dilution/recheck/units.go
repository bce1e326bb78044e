package recheck

import (
	"fmt"
	"strings"
)

// A dim counts the kinds in a unit, up for each above the stroke, down for each
// below it. Body weight is a kind of its own and never cancels drug mass;
// mass, units of activity and amount of substance never meet (rules R3, R4).
type dim [9]int8

const (
	inMass = iota
	inActivity
	inSubstance
	inVolume
	inWeight
	inLength
	inArea
	inTime
	inMonths // years and months of the calendar, which are no fixed number of days
)

func one(kind int) dim {
	var d dim
	d[kind] = 1
	return d
}

func (d dim) with(e dim, sign int8) dim {
	for i := range d {
		d[i] += sign * e[i]
	}
	return d
}

func (d dim) words() string {
	names := [...]string{"mass", "units of activity", "amount of substance", "volume", "body weight", "length", "surface area", "time", "calendar time"}
	var above, below []string
	for i, n := range d {
		for ; n > 0; n-- {
			above = append(above, names[i])
		}
		for ; n < 0; n++ {
			below = append(below, names[i])
		}
	}
	if len(above) == 0 {
		above = []string{"a plain number"}
	}
	return strings.Join(append([]string{strings.Join(above, " x ")}, below...), " per ")
}

// isDrug says whether d counts drug in one of the three ways.
func (d dim) isDrug() bool {
	return d == one(inMass) || d == one(inActivity) || d == one(inSubstance)
}

// A unit is a word of the table: its kind and how many of the smallest member
// it holds (nanograms, milliunits, nanomols, millilitres, kilograms,
// centimetres, square metres, minutes).
type unit struct {
	kind int
	size int64
}

// printedUnit is the table of unit words that paper may show.
func printedUnit(word string) (unit, bool) {
	switch word {
	case "g":
		return unit{inMass, 1_000_000_000}, true
	case "mg":
		return unit{inMass, 1_000_000}, true
	case "microgram", "micrograms", "mcg":
		return unit{inMass, 1_000}, true
	case "nanogram", "nanograms":
		return unit{inMass, 1}, true
	case "unit", "units":
		return unit{inActivity, 1_000}, true
	case "milliunit", "milliunits":
		return unit{inActivity, 1}, true
	case "mmol":
		return unit{inSubstance, 1_000_000}, true
	case "micromol", "micromols":
		return unit{inSubstance, 1_000}, true
	case "mL":
		return unit{inVolume, 1}, true
	case "L":
		return unit{inVolume, 1_000}, true
	case "kg":
		return unit{inWeight, 1}, true
	case "cm":
		return unit{inLength, 1}, true
	case "m²":
		return unit{inArea, 1}, true
	case "min":
		return unit{inTime, 1}, true
	case "h", "hour":
		return unit{inTime, 60}, true
	case "day":
		return unit{inTime, 1_440}, true
	}
	return unit{}, false
}

// typedUnit adds the words that people type and paper does not show.
func typedUnit(word string) (unit, bool) {
	switch word {
	case "milligram", "milligrams":
		return unit{inMass, 1_000_000}, true
	case "\u00b5g", "\u03bcg":
		return unit{inMass, 1_000}, true
	case "ng":
		return unit{inMass, 1}, true
	case "ml":
		return unit{inVolume, 1}, true
	case "m2":
		return unit{inArea, 1}, true
	case "hr", "hours":
		return unit{inTime, 60}, true
	case "days":
		return unit{inTime, 1_440}, true
	}
	return printedUnit(word)
}

// A reading is a printed quantity taken apart: the number as it stands, what
// one of its unit is, and both together.
type reading struct {
	number value
	unit   value
	whole  value
}

// compound reads "micrograms/kg/min" by the given table.
func compound(text string, table func(string) (unit, bool)) (value, error) {
	if text == "%" {
		return pair(1, 100), nil
	}
	words := strings.Split(text, "/")
	if len(words) > 3 {
		return value{}, fmt.Errorf("unit %q has too many strokes", text)
	}
	total := whole(1)
	for i, word := range words {
		u, ok := table(word)
		if !ok {
			return value{}, fmt.Errorf("unit %q is not in the table", word)
		}
		part := whole(u.size).ofKind(one(u.kind))
		if i == 0 {
			total = part
			continue
		}
		if total.dim[u.kind] != 0 {
			return value{}, fmt.Errorf("unit %q names one kind twice", text)
		}
		total = total.over(part)
	}
	return total, nil
}

// readPrinted reads "7.2 mL/h": a number, one space, a unit.
func readPrinted(text string) (reading, error) {
	number, words, found := strings.Cut(text, " ")
	if !found {
		return reading{}, fmt.Errorf("%q has no space between number and unit", text)
	}
	n, err := printedNumber(number)
	if err != nil {
		return reading{}, err
	}
	u, err := compound(words, printedUnit)
	if err != nil {
		return reading{}, err
	}
	if n.sign() == 0 && words == "L" || n.sign() == 0 && strings.HasPrefix(words, "L/") {
		return reading{}, fmt.Errorf("a volume of nothing is printed in mL, got %q", text)
	}
	return reading{number: n, unit: u, whole: n.times(u)}, nil
}

// readTyped reads a quantity as typed in an order or a formulary file; a word
// after the unit, as in "0.3 mg/kg lean", is given back beside it.
func readTyped(text string) (value, string, error) {
	text = strings.TrimSpace(text)
	end := 0
	for end < len(text) && (text[end] == '.' || text[end] >= '0' && text[end] <= '9') {
		end++
	}
	n, err := typedNumber(text[:end])
	if err != nil {
		return value{}, "", err
	}
	words := strings.Fields(text[end:])
	if len(words) == 0 || len(words) > 2 {
		return value{}, "", fmt.Errorf("want a number and a unit, got %q", text)
	}
	u, err := compound(words[0], typedUnit)
	if err != nil {
		return value{}, "", err
	}
	if len(words) == 1 {
		return n.times(u), "", nil
	}
	if _, ok := sizeFigure(words[1]); !ok {
		return value{}, "", fmt.Errorf("%q is not a kind of body size", words[1])
	}
	return n.times(u), words[1], nil
}

// readOldStrength reads the two strengths that people may type and paper never
// shows: "0.5 %" is 0.5 g in 100 mL, "1:10000" and "1 in 10000" are 1 g in so
// many mL.
func readOldStrength(text string) (value, bool) {
	gram, millilitre := whole(1_000_000_000).ofKind(one(inMass)), whole(1).ofKind(one(inVolume))
	text = strings.TrimSpace(text)
	if number, ok := strings.CutSuffix(text, "%"); ok {
		n, err := typedNumber(strings.TrimSpace(number))
		if err != nil {
			return value{}, false
		}
		return n.times(pair(1, 100)).times(gram).over(millilitre), true
	}
	number, ok := strings.CutPrefix(text, "1:")
	if !ok {
		number, ok = strings.CutPrefix(text, "1 in ")
	}
	n, err := typedNumber(number)
	if !ok || err != nil || n.sign() == 0 {
		return value{}, false
	}
	return gram.over(millilitre).over(n), true
}
