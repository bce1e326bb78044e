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
	switch c.texts[Method] {
	case neat:
		list = append(list, c.besideOther()...)
	case makeUpTo:
		if c.twoSteps {
			list = append(list, c.stepReadings()...)
			break
		}
		list = append(list, c.toleranceOf(DrugVolume, DrugBarrel), c.toleranceOf(FinalVolume, FinalBarrel))
	case addTo, withdraw:
		list = append(list, c.toleranceOf(DrugVolume, DrugBarrel))
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

// toleranceOf is the reading tolerance of a printed volume in its printed barrel.
func (c *check) toleranceOf(volume, barrel string) value {
	return readingTolerance(c.get(volume), c.get(barrel))
}

// stepReadings are those of a dilution in two steps, C = S (drug / made up to)
// (taken / final). Two on one side of the fraction that may be of one syringe
// count together, as correlated readings do.
func (c *check) stepReadings() []value {
	above := c.together(IntermediateDrugVolume, IntermediateDrugBarrel, TakenVolume, TakenBarrel)
	return append(above, c.together(IntermediateVolume, IntermediateBarrel, FinalVolume, FinalBarrel)...)
}

func (c *check) together(first, itsBarrel, second, thatBarrel string) []value {
	a, b := c.toleranceOf(first, itsBarrel), c.toleranceOf(second, thatBarrel)
	if sameValue(c.get(itsBarrel), c.get(thatBarrel)) {
		return []value{a.plus(b)}
	}
	return []value{a, b}
}

// besideOther is the part of a second drug that is drawn to a neat one: with V
// both together, u^2 = (other / V)^2 (u drug^2 + u other^2), as for a diluent that
// is measured and added.
func (c *check) besideOther() []value {
	if !c.twoDrugs {
		return nil
	}
	share := c.get(OtherVolume).over(c.get(FinalVolume))
	return []value{share.times(c.toleranceOf(DrugVolume, DrugBarrel)), share.times(c.toleranceOf(OtherVolume, OtherBarrel))}
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

func sameValue(a, b value) bool {
	return a.lack == "" && b.lack == "" && a.dim == b.dim && a.against(b) == 0
}
