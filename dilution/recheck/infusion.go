package recheck

// rateOf is the rule of a pump rate that belongs to a dose rate. It starts at
// the printed rate: the dose rates which the edges of its interval deliver must
// enclose the dose rate.
func rateOf(dose string, how rounding) rule {
	return measured(func(c *check, _ int, r reading) *objection {
		return c.rateFrom(c.get(dose), r, how)
	})
}

// startRate is half up, or down where a limit would have been passed.
func startRate(c *check, _ int, r reading) *objection {
	return c.rateFrom(c.get(StartDose), r, c.roundingOf(RateRounding))
}

// roundingOf is how a dose or rate was rounded: down is the safe side, so it
// needs no more than to be told.
func (c *check) roundingOf(name string) rounding {
	if c.was(name) && c.asked[name][0] == "down" {
		return downward
	}
	return halfUp
}

// rateFrom compares in the dose's own kind: rate x concentration against dose
// x weight, the step likewise.
func (c *check) rateFrom(dose value, r reading, how rounding) *objection {
	if dose.lack != "" {
		return object("", dose.lack)
	}
	if r.unit.dim != perHour().dim || r.unit.against(perHour()) != 0 {
		return object("", "a pump rate is printed in mL/h")
	}
	step := c.get(RateStep)
	wanted := dose.times(c.bodySize(dose, RateWeightBy, RateWeight))
	per := c.counted(c.exactConcentration(), drugKind(wanted))
	given := reading{number: r.number, unit: r.unit.times(per), whole: r.whole.times(per)}
	for _, v := range []value{step, wanted, per} {
		if v.lack != "" {
			return object("", v.lack)
		}
	}
	if per.sign() == 0 {
		return object("", "the syringe holds no drug")
	}
	return onStep(given, wanted, step.times(per), how)
}

// deliveredBy is the dose rate that a printed pump rate gives, in the kind of
// the dose.
func (c *check) deliveredBy(rate, dose value) value {
	per := c.counted(c.exactConcentration(), drugKind(dose))
	return rate.times(per).over(c.bodySize(dose, RateWeightBy, RateWeight))
}

func startDelivered(c *check, _ int, r reading) *objection {
	return short(r, c.deliveredBy(c.get(StartRate), c.get(StartDose)))
}

// ladderDose is a row's own dose rate. It is confirmed by the row's rate, and by
// the typed text where the order names the rows.
func ladderDose(c *check, row int, r reading) *objection {
	name := Row(Ladder, row, "dose")
	if c.was(name) {
		return exact(r, c.typed(name), "typed as")
	}
	start := c.get(StartDose)
	if start.lack != "" {
		return object("", start.lack)
	}
	if r.whole.dim != start.dim {
		return object("", "is not of the kind of start.dose")
	}
	if !c.has(Row(Ladder, row, "rate")) {
		return object("", "needs the row's rate, which is not printed")
	}
	return nil
}

func ladderRate(c *check, row int, r reading) *objection {
	return c.rateFrom(c.get(Row(Ladder, row, "dose")), r, halfUp)
}

func ladderDelivered(c *check, row int, r reading) *objection {
	return short(r, c.deliveredBy(c.get(Row(Ladder, row, "rate")), c.get(Row(Ladder, row, "dose"))))
}

// slipFactor says what a slip multiplies the start dose by. The pound is
// 0.45359237 kg.
func slipFactor(kind string) value {
	switch kind {
	case "per minute for per hour":
		return whole(60)
	case "per hour for per minute":
		return pair(1, 60)
	case "ten times":
		return whole(10)
	case "a tenth":
		return pair(1, 10)
	case poundsForKilograms:
		return pair(100_000_000, 45_359_237)
	}
	return lacking("the kind of slip is not known")
}

const poundsForKilograms = "pounds for kilograms"

// slipKind allows each kind once: two rows of one kind would mean that a word
// was changed where both show the same rate.
func slipKind(c *check, row int, text string) *objection {
	if f := slipFactor(text); f.lack != "" {
		return object("", f.lack)
	}
	if c.slips[text] != 1 {
		return object("", "two rows name this slip")
	}
	if text == poundsForKilograms && sizeNeeded(c.get(StartDose)) != one(inWeight) {
		return object("", "start.dose does not go by body weight")
	}
	if !c.has(Row(Slip, row, "rate")) {
		return object("", "needs the row's rate, which is not printed")
	}
	return nil
}

func slipRate(c *check, row int, r reading) *objection {
	kind, ok := c.texts[Row(Slip, row, "kind")]
	if !ok {
		return object("", "needs the row's kind, which is not printed")
	}
	return c.rateFrom(c.get(StartDose).times(slipFactor(kind)), r, halfUp)
}
