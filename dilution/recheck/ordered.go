package recheck

// This file holds what is drawn against everything in the order that says how
// much drug the syringe must hold.

// sources names what in the order says how much drug is wanted, the first to go
// by first. A count of doses says so where the final volume is asked and nothing
// else says how much.
func (c *check) sources() []string {
	var out []string
	for _, name := range []string{AmountInSyringe, Concentration} {
		if c.was(name) {
			out = append(out, name)
		}
	}
	if c.ruled() {
		out = append(out, RuleRate)
	}
	if len(out) == 0 && c.was(DoseCount) && c.was(FinalVolume) && c.texts[Method] != neat && !c.was(DrugVolume) && !c.was(ContainerCount) {
		out = append(out, DoseCount)
	}
	return out
}

// wantedAmount is the exact amount of drug that one of the sources asks for.
func (c *check) wantedAmount(source string) value {
	switch source {
	case AmountInSyringe:
		return c.typed(AmountInSyringe)
	case Concentration:
		return c.typed(Concentration).times(c.get(FinalVolume))
	case RuleRate:
		return c.ruleAmount()
	}
	return c.exactDoses()
}

// wantedVolume is the exact volume of drug that one of the sources needs.
func (c *check) wantedVolume(source string) value {
	if source == Concentration && c.texts[Method] == addTo {
		// C = S d / (rest + d), so d (S - C) = C rest.
		rest, asked := c.get(DiluentVolume), c.typed(Concentration)
		if c.twoDrugs {
			rest = rest.plus(c.get(OtherVolume))
		}
		return asked.times(rest).over(c.counted(c.exactStrength(), drugKind(asked)).minus(asked))
	}
	wanted := c.wantedAmount(source)
	return wanted.over(c.counted(c.exactStrength(), drugKind(wanted)))
}

// asOrdered holds the drawn volume against every source, and against a volume
// that was typed.
func (c *check) asOrdered(r reading, step value) *objection {
	sources := c.sources()
	for _, name := range sources {
		want := c.wantedVolume(name)
		if want.lack != "" {
			return object("", want.lack)
		}
		if want.dim != r.whole.dim {
			return object("", "what was asked as "+name+" is of another kind than the container holds")
		}
		if !roundsTo(r.whole, want, step, halfUp) {
			return object(nearest(want, step, halfUp, r.unit), "from the "+name+" asked")
		}
	}
	if c.was(DrugVolume) {
		return exact(r, c.typed(DrugVolume), "typed as")
	}
	if len(sources) > 0 {
		return nil
	}
	return c.fromWhole(r)
}

// fromWhole confirms a drawn volume that only the volume of the syringe or the
// number of containers decides.
func (c *check) fromWhole(r reading) *objection {
	if c.was(FinalVolume) && c.texts[Method] == neat {
		want := c.typed(FinalVolume)
		if c.twoDrugs {
			want = want.minus(c.get(OtherVolume))
		}
		return exact(r, want, "a neat syringe was asked with")
	}
	if c.was(ContainerCount) {
		return exact(r, c.held(), "whole containers hold")
	}
	return object("", "nothing in the order says how much drug to draw")
}

// doseOnly says whether the order asks doses and nothing about the mixture.
func (c *check) doseOnly() bool {
	for _, name := range []string{AmountInSyringe, Concentration, FinalVolume, DrugVolume, ContainerCount} {
		if c.was(name) {
			return false
		}
	}
	return c.was(Dose) && !c.ruled()
}

// notFull objects to a syringe of doses alone that holds more or less than they
// take.
func (c *check) notFull() *objection {
	given, final := c.givenVolume(), c.get(FinalVolume)
	if rest := given.minus(final); rest.lack != "" {
		return object("", rest.lack)
	}
	if given.against(final) != 0 {
		return object("", "only doses were asked, yet their volumes are not the whole final.volume")
	}
	return nil
}

// holdsTheDoses confirms a syringe that holds doses and nothing else: the volume
// given is the whole volume.
func (c *check) holdsTheDoses(r reading) *objection {
	if o := c.notFull(); o != nil {
		return o
	}
	if c.texts[Method] == neat && !c.twoDrugs {
		if c.has(DrugStep) {
			if o := c.graduated(r, DrugStep); o != nil {
				return o
			}
		}
		return exact(r, c.givenVolume(), "the doses' volume is")
	}
	stock := c.counted(c.exactStrength(), drugKind(c.get(Dose)))
	return onStep(r, c.exactDoses().over(stock), c.get(DrugStep), c.roundingOf(DoseRounding))
}

// doses is how many doses the syringe holds: one, unless a number is printed.
func (c *check) doses() value {
	switch {
	case c.has(DoseCount):
		return c.countOf(DoseCount)
	case c.was(DoseCount):
		return lacking("needs dose.count, which was typed, yet is not printed")
	}
	return whole(1)
}

// exactDoses is the amount of all doses, givenVolume the volume of all of them
// as they are drawn up or given.
func (c *check) exactDoses() value  { return c.exactDose().times(c.doses()) }
func (c *check) givenVolume() value { return c.get(DoseVolume).times(c.doses()) }

// doseCount is the number of doses as typed; the syringe holds them all.
func doseCount(c *check, _ int, text string) *objection {
	if o := c.typedCount(DoseCount, text); o != nil {
		return o
	}
	if !c.was(DoseCount) {
		return object("", "is not among what was typed, and no sum could confirm it")
	}
	given, final := c.givenVolume(), c.get(FinalVolume)
	rest := final.minus(given)
	switch {
	case rest.lack != "":
		return object("", rest.lack)
	case rest.sign() < 0:
		return object("", "so many doses take more than final.volume")
	case rest.sign() > 0 && c.texts[Method] == neat:
		return object("", "so many doses take less than final.volume, yet the syringe is neat")
	}
	return nil
}

// ruled says whether the mixture is one for a single weight, by a published rule.
func (c *check) ruled() bool { return c.has(RuleRate) || c.was(RuleRate) }

// ruleRate is what 1 mL/h gives: as typed, or by the rules of six (6 mg/kg in
// 100 mL) and of three (3 mg/kg in 50 mL) 1 microgram/kg/min.
func ruleRate(c *check, _ int, r reading) *objection {
	if c.was(RuleRate) {
		return exact(r, c.typed(RuleRate), "typed as")
	}
	microgram := whole(1_000).ofKind(one(inMass))
	byRule := microgram.over(whole(1).ofKind(one(inWeight))).over(whole(1).ofKind(one(inTime)))
	return exact(r, byRule, "by the rules of six and of three it is")
}

// ruleAmount is the drug of a mixture of which 1 mL/h gives rule.rate.
func (c *check) ruleAmount() value {
	rate := c.get(RuleRate)
	perTime := rate.times(c.bodySize(rate, RateWeightBy, RateWeight))
	return perTime.times(c.get(FinalVolume)).over(perHour())
}
