package recheck

// The four methods. "make up to", "add to" and "withdraw, then add" are three
// different sums of preparation (rule R5); in all of them the final volume is
// the drug volume and the diluent volume together.
const (
	neat     = "neat"
	makeUpTo = "make up to"
	addTo    = "add to"
	withdraw = "withdraw, then add"
)

// exactStrength is the strength from the container's own words, unrounded.
func (c *check) exactStrength() value {
	return c.once(Strength, func() value { return c.get(ContainerAmount).over(c.get(ContainerVolume)) })
}

// drawn is the volume drawn of the drug's containers.
func (c *check) drawn() value {
	if c.twoSteps {
		return c.get(IntermediateDrugVolume)
	}
	return c.get(DrugVolume)
}

// undiluted is what goes into the giving syringe beside the diluent.
func (c *check) undiluted() value {
	first := c.get(DrugVolume)
	if c.twoSteps {
		first = c.get(TakenVolume)
	}
	if c.twoDrugs {
		return first.plus(c.get(OtherVolume))
	}
	return first
}

func (c *check) exactAmount() value {
	return c.once(AmountInSyringe, func() value {
		if c.twoSteps {
			return c.get(TakenVolume).times(c.exactIntermediate())
		}
		return c.get(DrugVolume).times(c.exactStrength())
	})
}

func (c *check) exactConcentration() value {
	return c.once(Concentration, func() value { return c.exactAmount().over(c.get(FinalVolume)) })
}

// counted turns a strength or concentration of mass into one of substance, by
// the drug's own factor, where the other side of a sum counts substance.
func (c *check) counted(v value, kind int) value {
	if v.lack != "" || kind != inSubstance || v.dim[inSubstance] != 0 {
		return v
	}
	return v.times(c.get(SubstanceFactor))
}

// drugKind is the kind in which a value counts drug, or -1.
func drugKind(v value) int {
	for _, kind := range []int{inMass, inActivity, inSubstance} {
		if v.dim[kind] == 1 {
			return kind
		}
	}
	return -1
}

func method(c *check, _ int, text string) *objection {
	switch text {
	case neat:
		if c.twoSteps {
			return object(makeUpTo, "what is taken of an intermediate is made up")
		}
		if c.has(DiluentVolume) {
			return object("", "a neat syringe holds no diluent, yet diluent.volume is printed")
		}
		if !c.was(Method) {
			return exactNeat(c)
		}
	case makeUpTo, addTo, withdraw:
	default:
		return object("", "is not one of the four methods")
	}
	if c.twoSteps && text != makeUpTo {
		return object(makeUpTo, "what is taken of an intermediate is made up")
	}
	return c.sameText(Method, text)
}

// exactNeat confirms "neat" by its sum where the order left the method open.
func exactNeat(c *check) *objection {
	drug, final := c.undiluted(), c.get(FinalVolume)
	if rest := final.minus(drug); rest.lack != "" {
		return object("", rest.lack)
	}
	if drug.against(final) != 0 {
		return object("", "the final volume is not the drug volume")
	}
	return nil
}

func drugVolume(c *check, _ int, r reading) *objection {
	if r.whole.dim != one(inVolume) {
		return object("", "is not a volume")
	}
	if c.twoSteps {
		return exact(r, c.drawn(), "intermediate.drug.volume is printed as")
	}
	if c.doseOnly() {
		return c.holdsTheDoses(r)
	}
	if o := c.graduated(r, DrugStep); o != nil {
		return o
	}
	return c.asOrdered(r, c.get(DrugStep))
}

func diluentVolume(c *check, _ int, r reading) *objection {
	if r.whole.dim != one(inVolume) {
		return object("", "is not a volume")
	}
	if c.was(DiluentVolume) {
		return exact(r, c.typed(DiluentVolume), "typed as")
	}
	return exact(r, c.get(FinalVolume).minus(c.undiluted()), "final.volume less what is diluted is")
}

func finalVolume(c *check, _ int, r reading) *objection {
	if c.was(FinalVolume) {
		if o := exact(r, c.typed(FinalVolume), "typed as"); o != nil {
			return o
		}
	}
	switch c.texts[Method] {
	case neat:
		return exact(r, c.undiluted(), "a neat syringe holds no more than was drawn, which is")
	case makeUpTo, addTo, withdraw:
		return exact(r, c.undiluted().plus(c.get(DiluentVolume)), "what is diluted and diluent.volume together are")
	}
	return object("", "needs method, which is not printed or not known")
}

func amountInSyringe(c *check, _ int, r reading) *objection {
	return short(r, c.exactAmount())
}

func concentration(c *check, _ int, r reading) *objection {
	return short(r, c.exactConcentration())
}

// exactSecond is a second drug of the same container, or the second drug from a
// container of its own.
func (c *check) exactSecond() value {
	if c.twoDrugs {
		return c.exactOther()
	}
	return c.exactAmount().times(c.get(SecondContainer)).over(c.get(ContainerAmount))
}

func secondAmount(c *check, _ int, r reading) *objection { return short(r, c.exactSecond()) }

func secondConcentration(c *check, _ int, r reading) *objection {
	return short(r, c.exactSecond().over(c.get(FinalVolume)))
}

func substanceAmount(c *check, _ int, r reading) *objection {
	return short(r, c.exactAmount().times(c.get(SubstanceFactor)))
}

func substanceConcentration(c *check, _ int, r reading) *objection {
	return short(r, c.exactConcentration().times(c.get(SubstanceFactor)))
}
