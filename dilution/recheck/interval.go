package recheck

// readingTolerance is the graduated-capacity tolerance of ISO 7886-1, table 1,
// as a part of the volume x that is read in a barrel of nominal capacity v:
//
//	x below v/2:     1.5 % of v and 1 % of x (v from 5 mL), 1.5 % of v and 2 % of x (smaller)
//	x from v/2 up:   4 % of x (v from 5 mL), 5 % of x (smaller)
func readingTolerance(x, v value) value {
	x, v = x.bare(one(inVolume)), v.bare(one(inVolume))
	if x.lack != "" {
		return x
	}
	if v.lack != "" {
		return v
	}
	if x.sign() == 0 {
		return lacking("a volume of nothing is read in a barrel")
	}
	if x.against(v) > 0 {
		return lacking("the volume read is more than the barrel holds")
	}
	small := v.against(whole(5)) < 0
	if x.times(whole(2)).against(v) >= 0 {
		if small {
			return pair(5, 100)
		}
		return pair(4, 100)
	}
	ofRead := pair(1, 100)
	if small {
		ofRead = pair(2, 100)
	}
	return v.times(pair(15, 1_000)).over(x).plus(ofRead)
}

// components lists the relative half widths that the method lets in: the assay
// always, the reading of the drug volume unless neat, the reading of the final
// volume only where the syringe is made up to it.
func (c *check) components() ([]value, string) {
	list := []value{c.get(Assay)}
	drug := readingTolerance(c.get(DrugVolume), c.get(DrugBarrel))
	switch c.texts[Method] {
	case neat:
	case makeUpTo:
		list = append(list, drug, readingTolerance(c.get(FinalVolume), c.get(FinalBarrel)))
	case addTo, withdraw:
		list = append(list, drug)
	default:
		return nil, "needs method, which is not printed or not known"
	}
	for _, v := range list {
		if v.lack != "" {
			return nil, v.lack
		}
		if v.dim != (dim{}) {
			return nil, "a component of the interval is not a per cent figure"
		}
	}
	return list, ""
}

// intervalPercent compares squares: with u^2 = sum of a^2 / 3 the half width is
// the smaller of 2u and the plain sum of the a, so it reaches an edge exactly
// if both do.
func intervalPercent(c *check, _ int, r reading) *objection {
	list, lack := c.components()
	if lack != "" {
		return object("", lack)
	}
	plain, fourU := whole(0), whole(0)
	for _, a := range list {
		plain = plain.plus(a)
		fourU = fourU.plus(a.times(a).times(pair(4, 3)))
	}
	p := r.whole
	if p.dim != (dim{}) || !p.isMultiple(pair(1, 1_000)) {
		return object("", "is not a per cent figure to 0.1 %")
	}
	half := pair(5, 10_000)
	low, high := p.minus(half), p.plus(half)
	reaches := low.sign() <= 0 || plain.against(low) >= 0 && fourU.against(low.times(low)) >= 0
	passes := plain.against(high) >= 0 && fourU.against(high.times(high)) >= 0
	if reaches && !passes {
		return nil
	}
	return object("", "the half width does not round to it: plain sum "+decimal(plain.times(whole(100)), 3)+
		" %, square of 2u "+decimal(fourU.times(whole(10_000)), 3)+" (per cent squared)")
}

func intervalLow(c *check, _ int, r reading) *objection {
	return short(r, c.exactConcentration().times(whole(1).minus(c.percent())))
}

func intervalHigh(c *check, _ int, r reading) *objection {
	return short(r, c.exactConcentration().times(whole(1).plus(c.percent())))
}

func (c *check) percent() value { return c.get(IntervalPercent).bare(dim{}) }

// drugStep is one of the graduations that were typed, and belongs to the barrel.
func drugStep(c *check, _ int, r reading) *objection {
	if o := c.oneOf(DrugStep, r); o != nil {
		return o
	}
	return c.paired()
}

// paired holds barrel and graduation together: where several of each were
// typed, the first graduation is that of the first barrel, and so on.
func (c *check) paired() *objection {
	barrels, steps := c.asked[DrugBarrel], c.asked[DrugStep]
	if !c.has(DrugBarrel) || !c.has(DrugStep) || len(barrels) < 2 && len(steps) < 2 {
		return nil
	}
	if len(barrels) != len(steps) {
		return object("", "the barrels and graduations that were typed do not pair off")
	}
	barrel, step := c.get(DrugBarrel), c.get(DrugStep)
	for i := range barrels {
		v, _, err := readTyped(barrels[i])
		w, _, fault := readTyped(steps[i])
		if err == nil && fault == nil && sameValue(barrel, v) && sameValue(step, w) {
			return nil
		}
	}
	return object("", "no barrel that was typed has this capacity with this graduation")
}

func sameValue(a, b value) bool {
	return a.lack == "" && b.lack == "" && a.dim == b.dim && a.against(b) == 0
}

// drugBarrel is one of the barrels that were typed, and holds the volume.
func drugBarrel(c *check, _ int, r reading) *objection {
	if o := c.barrel(DrugBarrel, r, DrugVolume); o != nil {
		return o
	}
	return c.paired()
}

func finalBarrel(c *check, _ int, r reading) *objection {
	return c.barrel(FinalBarrel, r, FinalVolume)
}

func (c *check) barrel(name string, r reading, holds string) *objection {
	if o := c.oneOf(name, r); o != nil {
		return o
	}
	if t := readingTolerance(c.get(holds), r.whole); t.lack != "" {
		return object("", t.lack)
	}
	return nil
}
