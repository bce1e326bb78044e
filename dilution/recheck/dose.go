package recheck

// sizeFigure names the printed figure that a kind of body size stands in.
func sizeFigure(word string) (string, bool) {
	switch word {
	case "actual":
		return WeightActual, true
	case "ideal":
		return WeightIdeal, true
	case "adjusted":
		return WeightAdjusted, true
	case "lean":
		return WeightLean, true
	case "surface":
		return SurfaceArea, true
	}
	return "", false
}

// byNone is the word for a dose that goes by no body size.
const byNone = "none"

// sizeNeeded says what a dose is counted by: weight, surface or neither.
func sizeNeeded(dose value) dim {
	switch {
	case dose.lack != "":
		return dim{}
	case dose.dim[inWeight] == -1:
		return one(inWeight)
	case dose.dim[inArea] == -1:
		return one(inArea)
	}
	return dim{}
}

func doseWeightBy(c *check, _ int, text string) *objection {
	return c.sizeWord(text, DoseWeightBy, Dose, DoseWeight)
}

// rateWeightBy holds the word against the start dose, and against the rate of a
// mixture for one weight where there is one.
func rateWeightBy(c *check, _ int, text string) *objection {
	if c.has(RuleRate) {
		if o := c.sizeWord(text, RateWeightBy, RuleRate, RateWeight); o != nil || !c.has(StartDose) {
			return o
		}
	}
	return c.sizeWord(text, RateWeightBy, StartDose, RateWeight)
}

// sizeWord confirms "lean" and its like: the dose's own unit says whether it
// goes by weight or by surface, the typed word says by which weight. Without a
// typed word only "actual" passes: no other weight may be chosen silently.
func (c *check) sizeWord(text, by, dose, weight string) *objection {
	amount := c.get(dose)
	if amount.lack != "" {
		return object("", amount.lack)
	}
	need := sizeNeeded(amount)
	if text == byNone {
		if need != (dim{}) || c.has(weight) {
			return object("", "the dose goes by a body size, or one is printed")
		}
		return c.typedWord(byNone, by, dose)
	}
	if _, ok := sizeFigure(text); !ok {
		return object("", "is not a kind of body size")
	}
	if (text == "surface") != (need == one(inArea)) || need == (dim{}) {
		return object("", "does not fit the unit of "+dose)
	}
	return c.typedWord(text, by, dose)
}

func (c *check) typedWord(text, by, dose string) *objection {
	word := "actual"
	if text == "surface" || text == byNone {
		word = text
	}
	if c.was(dose) {
		if _, typed, err := readTyped(c.asked[dose][0]); err == nil && typed != "" {
			word = typed
		}
	}
	if c.was(by) {
		word = c.asked[by][0]
	}
	if word != text {
		return object(word, "the order names no other weight")
	}
	return nil
}

func doseWeight(c *check, _ int, r reading) *objection {
	return c.sizeOf(r, DoseWeightBy, Dose)
}

func rateWeight(c *check, _ int, r reading) *objection {
	if c.has(RuleRate) && !c.has(StartDose) {
		return c.sizeOf(r, RateWeightBy, RuleRate)
	}
	return c.sizeOf(r, RateWeightBy, StartDose)
}

// sizeOf holds the weight of a dose against the printed weight of its kind.
func (c *check) sizeOf(r reading, by, dose string) *objection {
	word, ok := c.texts[by]
	if !ok {
		return object("", "needs "+by+", which is not printed")
	}
	figure, ok := sizeFigure(word)
	if !ok {
		return object("", by+" names no body size")
	}
	if amount := c.get(dose); amount.lack != "" {
		return object("", amount.lack)
	} else if r.whole.dim != sizeNeeded(amount) {
		return object("", "does not fit the unit of "+dose)
	}
	return exact(r, c.get(figure), figure+" is printed as")
}

// bodySize is the exact printed size that a dose goes by, or 1.
func (c *check) bodySize(dose value, by, weight string) value {
	if dose.lack != "" {
		return dose
	}
	if sizeNeeded(dose) != (dim{}) {
		return c.get(weight)
	}
	if c.has(weight) {
		return lacking(weight + " is printed, yet the dose goes by no body size")
	}
	return whole(1)
}

func (c *check) exactDose() value {
	dose := c.get(Dose)
	total := dose.times(c.bodySize(dose, DoseWeightBy, DoseWeight))
	if total.lack == "" && !total.dim.isDrug() {
		return lacking("dose and dose.weight together are not an amount of drug")
	}
	return total
}

func doseAmount(c *check, _ int, r reading) *objection { return short(r, c.exactDose()) }

// doseVolume asks backwards: the printed volume, half a step less and half a
// step more, must hold the dose between them.
func doseVolume(c *check, _ int, r reading) *objection {
	step, dose := c.get(DoseStep), c.exactDose()
	strength := c.counted(c.exactConcentration(), drugKind(dose))
	return onStep(r, dose.over(strength), step, c.roundingOf(DoseRounding))
}

func doseDelivered(c *check, _ int, r reading) *objection {
	strength := c.counted(c.exactConcentration(), drugKind(r.whole))
	return short(r, c.get(DoseVolume).times(strength))
}
