package recheck

// This file holds a dilution in two steps against its sums. Every volume is on a
// graduation of its barrel; the amount follows from the exact figures, never from
// a printed concentration.

func intermediateDrugVolume(c *check, _ int, r reading) *objection {
	if o := c.graduated(r, IntermediateDrugStep); o != nil {
		return o
	}
	rest := c.get(IntermediateVolume).minus(r.whole)
	if rest.lack != "" {
		return object("", rest.lack)
	}
	if r.whole.sign() <= 0 || rest.sign() <= 0 {
		return object("", "is nothing, or is not diluted in intermediate.volume")
	}
	return nil
}

func intermediateVolume(c *check, _ int, r reading) *objection {
	if o := c.graduated(r, IntermediateStep); o != nil {
		return o
	}
	return exact(r, c.get(IntermediateDrugVolume).plus(c.get(IntermediateDiluent)), "intermediate.drug.volume and its diluent together are")
}

func intermediateDiluent(c *check, _ int, r reading) *objection {
	return exact(r, c.get(IntermediateVolume).minus(c.get(IntermediateDrugVolume)), "intermediate.volume less its drug volume is")
}

func (c *check) exactIntermediateAmount() value {
	return c.get(IntermediateDrugVolume).times(c.exactStrength())
}

// exactIntermediate is the concentration of the intermediate, unrounded.
func (c *check) exactIntermediate() value {
	return c.once(IntermediateConc, func() value { return c.exactIntermediateAmount().over(c.get(IntermediateVolume)) })
}

func intermediateAmount(c *check, _ int, r reading) *objection {
	return short(r, c.exactIntermediateAmount())
}

func intermediateConcentration(c *check, _ int, r reading) *objection {
	return short(r, c.exactIntermediate())
}

// takenVolume is on one of the two graduations beside what the order wants: the
// nearest, or the one below where a limit stands in the way.
func takenVolume(c *check, _ int, r reading) *objection {
	if o := c.graduated(r, TakenStep); o != nil {
		return o
	}
	if left := c.get(IntermediateVolume).minus(r.whole); left.lack != "" || left.sign() < 0 {
		return object(left.lack, "is more than intermediate.volume")
	}
	wants := c.wantedAmounts()
	if len(wants) == 0 {
		return object("", "nothing in the order says how much drug the syringe must hold")
	}
	if c.doseOnly() {
		if o := c.notFull(); o != nil {
			return o
		}
	}
	for _, amount := range wants {
		want := amount.over(c.counted(c.exactIntermediate(), drugKind(amount)))
		off := r.whole.minus(want)
		if off.lack != "" {
			return object("", off.lack)
		}
		step := c.get(TakenStep)
		if off.against(step) >= 0 || off.plus(step).sign() <= 0 {
			return object(nearest(want, step, halfUp, r.unit), "from what was asked")
		}
	}
	return nil
}

// wantedAmounts is the amount of drug in the syringe by everything in the order
// that says it, the first to go by first.
func (c *check) wantedAmounts() []value {
	if c.doseOnly() {
		return []value{c.exactDoses()}
	}
	var out []value
	for _, source := range c.sources() {
		out = append(out, c.wantedAmount(source))
	}
	return out
}

func (c *check) exactIntermediateLeft() value {
	return c.get(IntermediateVolume).minus(c.get(TakenVolume))
}

func intermediateLeftVolume(c *check, _ int, r reading) *objection {
	return short(r, c.exactIntermediateLeft())
}

func intermediateLeftAmount(c *check, _ int, r reading) *objection {
	return short(r, c.exactIntermediateLeft().times(c.exactIntermediate()))
}

// targetMoved is how far the concentration is from the asked one.
func targetMoved(c *check, _ int, text string) *objection {
	wants := c.wantedAmounts()
	if len(wants) == 0 {
		return object("", "nothing in the order says how much drug the syringe must hold")
	}
	wanted := wants[0].over(c.get(FinalVolume))
	return c.moved(text, c.counted(c.exactConcentration(), drugKind(wanted)), wanted)
}
