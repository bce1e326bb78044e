package recheck

import "strings"

// Weights are worked in plain numbers of kg and cm and get their kind back at
// the end.

func (c *check) kilograms() value   { return c.get(WeightActual).bare(one(inWeight)) }
func (c *check) centimetres() value { return c.get(Height).bare(one(inLength)) }

// man says whether the printed sex is male.
func (c *check) man() (bool, string) {
	text, ok := c.texts[Sex]
	if !ok {
		return false, "needs sex, which is not printed"
	}
	male, ok := readSex(text)
	if !ok {
		return false, "needs sex, which cannot be read"
	}
	return male, ""
}

// bySex chooses a coefficient.
func (c *check) bySex(man, woman value) value {
	male, lack := c.man()
	if lack != "" {
		return lacking(lack)
	}
	if male {
		return man
	}
	return woman
}

// readSex knows the words as they stand, in no other letter case.
func readSex(text string) (male, ok bool) {
	switch text {
	case "male", "man", "m", "M":
		return true, true
	case "female", "woman", "f", "F":
		return false, true
	}
	return false, false
}

func sex(c *check, _ int, text string) *objection {
	if !c.was(Sex) {
		return object("", "is not among what was typed, and no sum could confirm it")
	}
	typed := c.asked[Sex][0]
	p, ok := readSex(text)
	q, known := readSex(typed)
	if !ok || !known || p != q {
		return object(typed, "was typed so")
	}
	return nil
}

// age compares number and unit; a bare number only with the same bare number.
func age(c *check, _ int, text string) *objection {
	if !c.was(Age) {
		return object("", "is not among what was typed, and no sum could confirm it")
	}
	typed := c.asked[Age][0]
	if typed == text {
		return nil
	}
	n, words, _ := strings.Cut(text, " ")
	m, typedWords, _ := strings.Cut(typed, " ")
	p, err := printedNumber(n)
	q, fault := typedNumber(m)
	if err != nil || fault != nil || p.against(q) != 0 || ageUnit(words) == "" || ageUnit(words) != ageUnit(typedWords) {
		return object(typed, "was typed so")
	}
	return nil
}

func ageUnit(word string) string {
	switch word {
	case "y", "yr", "year", "years":
		return "year"
	case "month", "months":
		return "month"
	case "week", "weeks":
		return "week"
	case "day", "days":
		return "day"
	}
	return ""
}

// exactIdeal is Devine 1974: men 50, women 45.5, + 2.3 (inches - 60).
func (c *check) exactIdeal() value {
	inches := c.centimetres().over(pair(254, 100))
	return c.bySex(whole(50), pair(455, 10)).plus(inches.minus(whole(60)).times(pair(23, 10)))
}

// exactAdjusted is ideal + 0.4 (actual - ideal); below the ideal weight it is
// the actual weight.
func (c *check) exactAdjusted() value {
	ideal, actual := c.exactIdeal(), c.kilograms()
	more := actual.minus(ideal)
	if more.lack == "" && more.sign() < 0 {
		return actual
	}
	return ideal.plus(more.times(pair(4, 10)))
}

// exactBMI is kg over square metres.
func (c *check) exactBMI() value {
	h := c.centimetres()
	return c.kilograms().times(whole(10_000)).over(h.times(h))
}

// exactLean is Janmahasatian 2005: men 9270 W / (6680 + 216 BMI), women
// 9270 W / (8780 + 244 BMI).
func (c *check) exactLean() value {
	below := c.bySex(whole(6680), whole(8780)).plus(c.bySex(whole(216), whole(244)).times(c.exactBMI()))
	return c.kilograms().times(whole(9270)).over(below)
}

// exactJames is James 1976: men 1.10 W - 128 (W/H)^2, women 1.07 W - 148 (W/H)^2.
func (c *check) exactJames() value {
	w := c.kilograms()
	ratio := w.over(c.centimetres())
	return c.bySex(pair(110, 100), pair(107, 100)).times(w).minus(c.bySex(whole(128), whole(148)).times(ratio).times(ratio))
}

// weightIs compares a printed weight with one worked in plain kilograms.
func weightIs(r reading, kilograms, step value) *objection {
	kilogram := one(inWeight)
	if kilograms.lack == "" && kilograms.sign() <= 0 {
		return object(decimal(kilograms, 3), "no weight comes out")
	}
	return onStep(r, kilograms.ofKind(kilogram), step.ofKind(kilogram), halfUp)
}

// tenthKilogram is the step of a weight that doses go by; fourDecimals that of
// the same weight before it was brought there.
func tenthKilogram() value { return pair(1, 10) }
func fourDecimals() value  { return pair(1, 10_000) }

func weightIdeal(c *check, _ int, r reading) *objection {
	return weightIs(r, c.exactIdeal(), tenthKilogram())
}

func weightAdjusted(c *check, _ int, r reading) *objection {
	return weightIs(r, c.exactAdjusted(), tenthKilogram())
}

func weightLean(c *check, _ int, r reading) *objection {
	return weightIs(r, c.exactLean(), tenthKilogram())
}

func weightJames(c *check, _ int, r reading) *objection {
	return weightIs(r, c.exactJames(), tenthKilogram())
}

func idealFull(c *check, _ int, r reading) *objection {
	return weightIs(r, c.exactIdeal(), fourDecimals())
}

func adjustedFull(c *check, _ int, r reading) *objection {
	return weightIs(r, c.exactAdjusted(), fourDecimals())
}

func leanFull(c *check, _ int, r reading) *objection {
	return weightIs(r, c.exactLean(), fourDecimals())
}

// surfaceArea is Mosteller 1987, the root of H W / 3600. No root is taken:
// (printed - half a step) squared and (printed + half a step) squared must
// enclose H W / 3600.
func surfaceArea(c *check, _ int, r reading) *objection {
	square := c.centimetres().times(c.kilograms()).over(whole(3600))
	if square.lack != "" {
		return object("", square.lack)
	}
	p := r.whole.bare(one(inArea))
	if p.lack != "" {
		return object("", p.lack)
	}
	if !p.isMultiple(pair(1, 100)) {
		return object("", "is not printed to 0.01 m²")
	}
	half := pair(5, 1_000)
	low, high := p.minus(half), p.plus(half)
	if low.sign() < 0 || low.times(low).against(square) > 0 || square.against(high.times(high)) >= 0 {
		return object("", "its square does not lie about height x weight / 3600, "+decimal(square, 6))
	}
	return nil
}

// bodyMassIndex is printed bare or in kg/m².
func bodyMassIndex(c *check, _ int, text string) *objection {
	n, err := printedNumber(strings.TrimSuffix(text, " kg/m²"))
	if err != nil {
		return object("", "cannot be read: "+err.Error())
	}
	return onStep(reading{number: n, unit: whole(1), whole: n}, c.exactBMI(), pair(1, 10), halfUp)
}
