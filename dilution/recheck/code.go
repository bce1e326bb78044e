package recheck

import (
	"fmt"
	"slices"
	"strings"
)

// A codePart is one identifier of the barcode with what stands behind it.
type codePart struct{ identifier, value string }

// code takes the barcode's words apart from the left and holds every part
// against the figure that it repeats. Where the site has a number of its own for
// the preparation the code begins with it, else it has none.
func code(c *check, _ int, text string) *objection {
	parts, shape := codeParts(text)
	allowed := []string{"91 92 93 94 95 96", "91 92 93 94 95", "91 92 93"}
	if c.was(ProductNumber) {
		allowed = []string{"01 7003 10 21 91 93 94 95 96", "01 7003 10 21 91 93 94 95", "01 7003 10 21", "01 7003 21"}
	}
	if !slices.Contains(allowed, shape) {
		return object("one of "+strings.Join(allowed, ", "), "has the identifiers "+shape)
	}
	for _, p := range parts {
		if o := c.codePart(p); o != nil {
			return object(o.gets, "("+p.identifier+") "+o.why)
		}
	}
	return nil
}

// codeParts cuts "(91)a(92)b" at its parentheses; the shape is the identifiers
// in their order, with a question mark for what is none.
func codeParts(text string) (parts []codePart, shape string) {
	var seen []string
	for text != "" {
		inside, rest, found := strings.Cut(strings.TrimPrefix(text, "("), ")")
		if text[0] != '(' || !found || !digitsOnly(inside) || inside == "" {
			return nil, strings.Join(append(seen, "?"), " ")
		}
		end := strings.IndexByte(rest, '(')
		if end < 0 {
			end = len(rest)
		}
		parts, seen = append(parts, codePart{inside, rest[:end]}), append(seen, inside)
		text = rest[end:]
	}
	return parts, strings.Join(seen, " ")
}

// codePart holds one part against what it repeats.
func (c *check) codePart(p codePart) *objection {
	switch p.identifier {
	case "91":
		return c.codedText(p.value, c.drugCode())
	case "92":
		until := c.codedUntil()
		serial := c.printedText(Serial)
		return c.codedText(p.value, lackedText{until.text + serial.text, until.lack + serial.lack})
	case "7003":
		return c.codedText(p.value, c.codedUntil())
	case "21":
		return c.codedText(p.value, c.printedText(Serial))
	case "10":
		return c.codedText(p.value, c.askedText(Ref))
	case "93":
		return c.codedFigure(p.value, "/mL", Concentration)
	case "94":
		return c.codedFigure(p.value, "", AmountInSyringe)
	case "96":
		return c.codedFigure(p.value, "/mL", SecondConcentrated)
	case "95":
		digest := c.askedText(FormularyDigest)
		if digest.lack == "" && len(digest.text) < 8 {
			digest.lack = "needs eight digits of the formulary's digest"
		}
		if digest.lack == "" {
			digest.text = digest.text[:8]
		}
		return c.codedText(p.value, digest)
	case "01":
		return c.product(p.value)
	}
	return object("", "is an identifier without a rule")
}

// A lackedText is a text to compare with, or what is lacking for it.
type lackedText struct{ text, lack string }

func (c *check) codedText(got string, want lackedText) *objection {
	switch {
	case want.lack != "":
		return object("", want.lack)
	case got != want.text:
		return object(want.text, "repeats another text")
	}
	return nil
}

func (c *check) printedText(name string) lackedText {
	if !c.has(name) {
		return lackedText{lack: "needs " + name + ", which is not printed"}
	}
	return lackedText{text: c.texts[name]}
}

func (c *check) askedText(name string) lackedText {
	if !c.was(name) {
		return lackedText{lack: "needs " + name + ", which is not among what was asked"}
	}
	return lackedText{text: c.asked[name][0]}
}

// drugCode is the drug's ATC code, printed or from the record.
func (c *check) drugCode() lackedText {
	if c.has(ATC) {
		return lackedText{text: c.texts[ATC]}
	}
	known, problem := c.record.drug("atc")
	if problem != "" {
		return lackedText{lack: "needs atc: it is not printed, and " + problem}
	}
	return lackedText{text: known}
}

// codedUntil is the printed use-by as ten digits, year first.
func (c *check) codedUntil() lackedText {
	printed := c.printedText(UseBy)
	if printed.lack != "" {
		return printed
	}
	until, ok := readMoment(printed.text)
	if !ok {
		return lackedText{lack: "needs use.by, which cannot be read"}
	}
	return lackedText{text: until.Format("0601021504")}
}

// codedFigure holds "2mg/mL" or "20mg" against the printed figure.
func (c *check) codedFigure(text, per, name string) *objection {
	got, err := readCoded(text, per)
	if err != nil {
		return object("", err.Error())
	}
	want := c.get(name)
	if want.lack != "" {
		return object("", want.lack)
	}
	if got.dim != want.dim || got.against(want) != 0 {
		return object(c.texts[name], "is another figure than the printed one")
	}
	return nil
}

// readCoded reads a number without blanks and one of the code's own unit words,
// then what it is counted per, "/mL" or nothing.
func readCoded(text, per string) (value, error) {
	end := 0
	for end < len(text) && (text[end] == '.' || text[end] >= '0' && text[end] <= '9') {
		end++
	}
	n, err := typedNumber(text[:end])
	if err != nil || strings.HasSuffix(text[:end], "0") && strings.Contains(text[:end], ".") || end > 1 && text[0] == '0' && text[1] != '.' {
		return value{}, fmt.Errorf("the number in %q cannot be read", text)
	}
	word, found := strings.CutSuffix(text[end:], per)
	if !found {
		return value{}, fmt.Errorf("the unit in %q is not counted %s", text, per)
	}
	u, ok := codedUnit(word)
	if !ok {
		return value{}, fmt.Errorf("the unit in %q is not one of g mg ug ng unit mmol umol", text)
	}
	amount := n.times(whole(u.size).ofKind(one(u.kind)))
	if per == "" {
		return amount, nil
	}
	return amount.over(whole(1).ofKind(one(inVolume))), nil
}

func codedUnit(word string) (unit, bool) {
	switch word {
	case "g":
		return unit{inMass, 1_000_000_000}, true
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

// product holds the number of (01) against the site's own for this preparation:
// the number as typed, filled up to fourteen digits, whose sum with every other
// digit three times ends in nought; the drug under one of its names; and the
// concentration and volume that the number stands for, as printed.
func (c *check) product(number string) *objection {
	typed := c.askedText(ProductNumber).text
	if !digitsOnly(typed) || len(typed) > 14 || number != strings.Repeat("0", 14-len(typed))+typed {
		return object(typed, "is not the site's own number")
	}
	sum := 0
	for i, d := range number {
		times := 1
		if i%2 == 0 {
			times = 3
		}
		sum += times * int(d-'0')
	}
	if sum%10 != 0 {
		return object("", "has a check digit that does not fit")
	}
	drug := c.askedText(ProductDrug)
	block := c.blockTexts()
	names := append(slices.Clone(block.texts[:block.own]), c.drug)
	if drug.lack != "" || !slices.ContainsFunc(names, func(n string) bool { return strings.EqualFold(n, strings.TrimSpace(drug.text)) }) {
		return object(drug.text, "stands for another drug")
	}
	if o := c.sameAsTyped(Concentration, ProductConcentration); o != nil {
		return o
	}
	return c.sameAsTyped(FinalVolume, ProductVolume)
}

// sameAsTyped holds a printed figure against a typed one, by the rule of
// printing.
func (c *check) sameAsTyped(name, typed string) *objection {
	want := c.askedText(typed)
	if want.lack != "" {
		return object("", want.lack)
	}
	if !c.has(name) {
		return object("", "needs "+name+", which is not printed")
	}
	r, err := c.parse(c.texts[name])
	if err != nil {
		return object("", "needs "+name+", which cannot be read")
	}
	return short(r, typedStrength(want.text))
}

// typedStrength reads a typed quantity, also "4 mg in 50 mL", "200 mg/5 mL" and
// the two old ways of a strength.
func typedStrength(text string) value {
	if v, ok := readOldStrength(text); ok {
		return v
	}
	amount, volume, found := strings.Cut(text, " in ")
	if at := strings.IndexByte(text, '/'); !found && at >= 0 && at+1 < len(text) && text[at+1] >= '0' && text[at+1] <= '9' {
		amount, volume, found = text[:at], text[at+1:], true
	}
	if found {
		return typedStrength(strings.TrimSpace(amount)).over(typedStrength(strings.TrimSpace(volume)))
	}
	v, _, err := readTyped(text)
	if err != nil {
		return lacking(fmt.Sprintf("typed %q: %v", text, err))
	}
	return v
}

// ref is the short name of the run, which the run itself gives.
func ref(c *check, _ int, text string) *objection { return c.sameText(Ref, text) }

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
	return c.partOf(ATC, text, Row(Code, 1, "text"))
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
	return c.partOf(Serial, text, Row(Code, 1, "text"))
}
