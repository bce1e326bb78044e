package recheck

import (
	"fmt"
	"strings"
)

// code takes the barcode's words apart from the left and holds every part
// against the figure that it repeats.
func code(c *check, _ int, text string) *objection {
	for _, name := range []string{UseBy, Serial, Concentration} {
		if !c.has(name) {
			return object("", "needs "+name+", which is not printed")
		}
	}
	drug := c.texts[ATC]
	if drug == "" {
		known, problem := c.record.drug("atc")
		if problem != "" {
			return object("", "needs atc: it is not printed, and "+problem)
		}
		drug = known
	}
	until, ok := readMoment(c.texts[UseBy])
	if !ok {
		return object("", "needs use.by, which cannot be read")
	}
	start := "(91)" + drug + "(92)" + until.Format("0601021504") + c.texts[Serial] + "(93)"
	strength, found := strings.CutPrefix(text, start)
	if !found {
		return object(start+"...", "from atc, use.by and serial")
	}
	got, err := readCoded(strength)
	if err != nil {
		return object("", err.Error())
	}
	want := c.get(Concentration)
	if want.lack != "" {
		return object("", want.lack)
	}
	if got.dim != want.dim || got.against(want) != 0 {
		return object(start+" and "+c.texts[Concentration], "from the printed concentration")
	}
	return nil
}

// readCoded reads "2mg/mL": a number without blanks and one of the code's own
// five unit words, per mL.
func readCoded(text string) (value, error) {
	end := 0
	for end < len(text) && (text[end] == '.' || text[end] >= '0' && text[end] <= '9') {
		end++
	}
	n, err := typedNumber(text[:end])
	if err != nil || strings.HasSuffix(text[:end], "0") && strings.Contains(text[:end], ".") || end > 1 && text[0] == '0' && text[1] != '.' {
		return value{}, fmt.Errorf("the number in (93), %q, cannot be read", text)
	}
	word, found := strings.CutSuffix(text[end:], "/mL")
	if !found {
		return value{}, fmt.Errorf("the unit in (93), %q, is not per mL", text)
	}
	u, ok := codedUnit(word)
	if !ok {
		return value{}, fmt.Errorf("the unit in (93), %q, is not one of mg ug ng unit mmol", text)
	}
	return n.times(whole(u.size).ofKind(one(u.kind))).over(whole(1).ofKind(one(inVolume))), nil
}

func codedUnit(word string) (unit, bool) {
	switch word {
	case "mg":
		return unit{inMass, 1_000_000}, true
	case "ug":
		return unit{inMass, 1_000}, true
	case "ng":
		return unit{inMass, 1}, true
	case "unit":
		return unit{inActivity, 1_000}, true
	case "mmol":
		return unit{inSubstance, 1_000_000}, true
	case "umol":
		return unit{inSubstance, 1_000}, true
	}
	return unit{}, false
}

// atc is seven signs, letter digit digit letter letter digit digit, as the
// record or the order has it or else as the code repeats it.
func atc(c *check, _ int, text string) *objection {
	if !shapedATC(text) {
		return object("", "is not of the form A00AA00")
	}
	if known, problem := c.record.drug("atc"); problem == "" && known != text {
		return object(known, "the record says")
	} else if problem == "" {
		return nil
	}
	return c.partOf(ATC, text, Code)
}

func shapedATC(text string) bool {
	const form = "A00AA00"
	if len(text) != len(form) {
		return false
	}
	for i := range form {
		low, high := byte('0'), byte('9')
		if form[i] == 'A' {
			low, high = 'A', 'Z'
		}
		if text[i] < low || text[i] > high {
			return false
		}
	}
	return true
}

func serial(c *check, _ int, text string) *objection {
	if len(text) != 8 || !digitsOnly(text) {
		return object("", "is not eight digits")
	}
	return c.partOf(Serial, text, Code)
}
