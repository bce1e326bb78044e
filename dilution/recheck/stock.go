package recheck

// This file holds barrels and graduations against what was typed as in stock.

// A barrelUse is what one barrel measures, and the graduation it is read on; the
// giving barrel has no graduation of its own.
type barrelUse struct{ barrel, step, holds string }

func barrelUses() []barrelUse {
	return []barrelUse{
		{DrugBarrel, DrugStep, DrugVolume},
		{FinalBarrel, "", FinalVolume},
		{IntermediateDrugBarrel, IntermediateDrugStep, IntermediateDrugVolume},
		{IntermediateBarrel, IntermediateStep, IntermediateVolume},
		{TakenBarrel, TakenStep, TakenVolume},
		{OtherBarrel, OtherStep, OtherVolume},
	}
}

// stockOf is what was typed to choose a barrel or a graduation from: under the
// figure's own name, or else as the site's barrels of drug.barrel and drug.step.
func (c *check) stockOf(name string) []string {
	if c.was(name) {
		return c.asked[name]
	}
	for _, use := range barrelUses() {
		switch {
		case use.step == "":
		case name == use.barrel:
			return c.asked[DrugBarrel]
		case name == use.step:
			return c.asked[DrugStep]
		}
	}
	return nil
}

// useOf is the use that a barrel or graduation belongs to.
func useOf(name string) barrelUse {
	for _, use := range barrelUses() {
		if name == use.barrel || name == use.step {
			return use
		}
	}
	return barrelUse{}
}

// stepOf is the rule of a graduation: one of those typed, and its barrel's. That
// of an intermediate and of a second drug is nothing without its barrel.
func stepOf(name string) rule {
	use := useOf(name)
	return measured(func(c *check, _ int, r reading) *objection {
		if o := c.oneOf(name, r); o != nil {
			return o
		}
		if use.barrel != DrugBarrel && !c.has(use.barrel) {
			return object("", "needs "+use.barrel+", which is not printed")
		}
		return c.paired(use)
	})
}

// barrelOf is the rule of a nominal capacity: one of those typed, with its
// graduation, and no less than the volume that is read in it.
func barrelOf(name string) rule {
	use := useOf(name)
	return measured(func(c *check, _ int, r reading) *objection {
		if o := c.oneOf(name, r); o != nil {
			return o
		}
		if t := readingTolerance(c.get(use.holds), r.whole); t.lack != "" {
			return object("", t.lack)
		}
		return c.paired(use)
	})
}

// paired holds barrel and graduation together: where several of each were
// typed, the first graduation is that of the first barrel, and so on.
func (c *check) paired(use barrelUse) *objection {
	if use.step == "" || !c.has(use.barrel) || !c.has(use.step) {
		return nil
	}
	barrels, steps := c.stockOf(use.barrel), c.stockOf(use.step)
	if len(barrels) < 2 && len(steps) < 2 {
		return nil
	}
	if len(barrels) != len(steps) {
		return object("", "the barrels and graduations that were typed do not pair off")
	}
	barrel, step := c.get(use.barrel), c.get(use.step)
	for i := range barrels {
		v, _, err := readTyped(barrels[i])
		w, _, fault := readTyped(steps[i])
		if err == nil && fault == nil && sameValue(barrel, v) && sameValue(step, w) {
			return nil
		}
	}
	return object("", "no barrel that was typed has this capacity with this graduation")
}

// graduated objects to a printed volume that is not a whole number of its
// printed graduation.
func (c *check) graduated(r reading, name string) *objection {
	if r.whole.dim != one(inVolume) {
		return object("", "is not a volume")
	}
	step := c.get(name)
	if step.lack != "" {
		return object("", step.lack)
	}
	if step.dim != one(inVolume) || !r.whole.isMultiple(step) {
		return object("", "is not a whole number of "+name)
	}
	return nil
}
