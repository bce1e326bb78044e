package recheck

import "strings"

// This file confirms values before they were rounded, and what the rounding
// lost (rule R2).

// exactWanted is the volume of drug that the order takes before it is brought
// to a graduation. Where the order says it in several ways, an amount goes
// before a concentration, and that before a drawn volume.
func (c *check) exactWanted() value {
	if c.doseOnly() {
		doses := c.exactDoses()
		return doses.over(c.counted(c.exactStrength(), drugKind(doses)))
	}
	if sources := c.sources(); len(sources) > 0 {
		return c.wantedVolume(sources[0])
	}
	switch {
	case c.was(DrugVolume):
		return c.typed(DrugVolume)
	case c.was(FinalVolume) && c.texts[Method] == neat && c.twoDrugs:
		return c.typed(FinalVolume).minus(c.get(OtherVolume))
	case c.was(FinalVolume) && c.texts[Method] == neat:
		return c.typed(FinalVolume)
	case c.was(ContainerCount):
		return c.held()
	}
	return lacking("nothing in the order says how much drug to draw")
}

func (c *check) exactDoseVolume() value {
	dose := c.exactDose()
	return dose.over(c.counted(c.exactConcentration(), drugKind(dose)))
}

func (c *check) exactFlow() value {
	dose := c.get(StartDose)
	wanted := dose.times(c.bodySize(dose, RateWeightBy, RateWeight))
	return wanted.over(c.counted(c.exactConcentration(), drugKind(wanted)))
}

func drugWanted(c *check, _ int, r reading) *objection { return short(r, c.exactWanted()) }
func doseWanted(c *check, _ int, r reading) *objection { return short(r, c.exactDoseVolume()) }

func startFlow(c *check, _ int, r reading) *objection {
	if r.unit.dim != perHour().dim || r.unit.against(perHour()) != 0 {
		return object("", "a flow rate is printed in mL/h")
	}
	return short(r, c.exactFlow())
}

func drugMoved(c *check, _ int, text string) *objection {
	if c.twoSteps {
		return object("", "of a dilution in two steps target.moved says what the rounding lost")
	}
	return c.moved(text, c.get(DrugVolume), c.exactWanted())
}

func doseMoved(c *check, _ int, text string) *objection {
	return c.moved(text, c.get(DoseVolume), c.exactDoseVolume())
}

func startMoved(c *check, _ int, text string) *objection {
	return c.moved(text, c.get(StartRate), c.exactFlow())
}

// unmoved is printed where the rounding lost nothing at all.
const unmoved = "nothing"

// moved confirms "1.12 % more", "0.7 % less" or "nothing" between a rounded
// value and the exact one.
func (c *check) moved(text string, rounded, exact value) *objection {
	off := rounded.minus(exact)
	if off.lack != "" {
		return object("", off.lack)
	}
	if exact.sign() <= 0 {
		return object("", "the value before rounding is not above nothing")
	}
	word, back := "more", off
	if off.sign() < 0 {
		word, back = "less", exact.minus(rounded)
	}
	share := back.over(exact)
	percent := pair(1, 100)
	gets := unmoved
	if off.sign() != 0 {
		gets = shortWords(share, percent) + " % " + word
	}
	if text == unmoved || off.sign() == 0 {
		if text == unmoved && off.sign() == 0 {
			return nil
		}
		return object(gets, "")
	}
	printed, ok := strings.CutSuffix(text, " "+word)
	if !ok {
		return object(gets, "")
	}
	r, err := c.parse(printed)
	if err != nil {
		return object("", "cannot be read: "+err.Error())
	}
	if !strings.HasSuffix(printed, " %") || !isShort(r.number, share.over(percent)) {
		return object(gets, "")
	}
	return nil
}

// perHour is one mL/h.
func perHour() value {
	return whole(1).ofKind(one(inVolume)).over(whole(60).ofKind(one(inTime)))
}
