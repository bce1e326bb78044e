package recheck

import (
	"math/big"
)

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

func (c *check) exactAmount() value {
	return c.once(AmountInSyringe, func() value { return c.get(DrugVolume).times(c.exactStrength()) })
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
	return c.sameText(Method, text)
}

// exactNeat confirms "neat" by its sum where the order left the method open.
func exactNeat(c *check) *objection {
	drug, final := c.get(DrugVolume), c.get(FinalVolume)
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
	if c.doseOnly() {
		return c.holdsTheDose(r)
	}
	step := c.get(DrugStep)
	if step.lack != "" {
		return object("", step.lack)
	}
	if step.dim != one(inVolume) || !r.whole.isMultiple(step) {
		return object("", "is not a whole number of drug.step")
	}
	return c.asOrdered(r, step)
}

// asOrdered holds the drawn volume against everything in the order that says
// how much drug the syringe must hold.
func (c *check) asOrdered(r reading, step value) *objection {
	bound := false
	for _, name := range []string{AmountInSyringe, Concentration} {
		if !c.was(name) {
			continue
		}
		bound = true
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
		bound = true
		if o := exact(r, c.typed(DrugVolume), "typed as"); o != nil {
			return o
		}
	}
	if bound {
		return nil
	}
	return c.fromWhole(r)
}

// fromWhole confirms a drawn volume that only the volume of the syringe or the
// number of containers decides.
func (c *check) fromWhole(r reading) *objection {
	if c.was(FinalVolume) && c.texts[Method] == neat {
		return exact(r, c.typed(FinalVolume), "a neat syringe was asked with")
	}
	if c.was(ContainerCount) {
		return exact(r, c.count().times(c.get(ContainerVolume)), "whole containers hold")
	}
	return object("", "nothing in the order says how much drug to draw")
}

// wantedVolume is the exact volume of drug that an asked amount or an asked
// concentration needs.
func (c *check) wantedVolume(name string) value {
	asked := c.typed(name)
	if asked.lack != "" {
		return asked
	}
	stock := c.counted(c.exactStrength(), drugKind(asked))
	if name == AmountInSyringe {
		return asked.over(stock)
	}
	if c.texts[Method] == addTo {
		// C = S d / (bag + d), so d (S - C) = C bag.
		return asked.times(c.get(DiluentVolume)).over(stock.minus(asked))
	}
	return asked.times(c.get(FinalVolume)).over(stock)
}

// doseOnly says whether the order asks a dose and nothing about the mixture.
func (c *check) doseOnly() bool {
	for _, name := range []string{AmountInSyringe, Concentration, FinalVolume, DrugVolume, ContainerCount} {
		if c.was(name) {
			return false
		}
	}
	return c.was(Dose)
}

// holdsTheDose confirms a syringe that holds exactly one dose: the volume given
// is the whole volume.
func (c *check) holdsTheDose(r reading) *objection {
	given, final := c.get(DoseVolume), c.get(FinalVolume)
	if rest := given.minus(final); rest.lack != "" {
		return object("", rest.lack)
	}
	if given.against(final) != 0 {
		return object("", "only a dose was asked, yet dose.volume is not the whole final.volume")
	}
	if c.texts[Method] == neat {
		if c.has(DrugStep) && c.stepFault(r) {
			return object("", "is not a whole number of drug.step")
		}
		return exact(r, given, "the dose volume is")
	}
	step := c.get(DrugStep)
	stock := c.counted(c.exactStrength(), drugKind(c.get(Dose)))
	return onStep(r, c.exactDose().over(stock), step, c.roundingOf(DoseRounding))
}

func (c *check) stepFault(r reading) bool {
	step := c.get(DrugStep)
	return step.lack != "" || step.dim != r.whole.dim || !r.whole.isMultiple(step)
}

func diluentVolume(c *check, _ int, r reading) *objection {
	if r.whole.dim != one(inVolume) {
		return object("", "is not a volume")
	}
	if c.was(DiluentVolume) {
		return exact(r, c.typed(DiluentVolume), "typed as")
	}
	return exact(r, c.get(FinalVolume).minus(c.get(DrugVolume)), "final.volume less drug.volume is")
}

func finalVolume(c *check, _ int, r reading) *objection {
	if c.was(FinalVolume) {
		if o := exact(r, c.typed(FinalVolume), "typed as"); o != nil {
			return o
		}
	}
	switch c.texts[Method] {
	case neat:
		return exact(r, c.get(DrugVolume), "a neat syringe holds drug.volume only, which is")
	case makeUpTo, addTo, withdraw:
		return exact(r, c.get(DrugVolume).plus(c.get(DiluentVolume)), "drug.volume and diluent.volume together are")
	}
	return object("", "needs method, which is not printed or not known")
}

func amountInSyringe(c *check, _ int, r reading) *objection {
	return short(r, c.exactAmount())
}

func concentration(c *check, _ int, r reading) *objection {
	return short(r, c.exactConcentration())
}

// count is the number of containers opened.
func (c *check) count() value {
	text, ok := c.texts[ContainerCount]
	if !ok {
		return lacking("needs container.count, which is not printed")
	}
	n, err := printedNumber(text)
	if err != nil || n.den.Cmp(big.NewInt(1)) != 0 || n.sign() == 0 {
		return lacking("needs container.count, which cannot be read")
	}
	return n
}

func containerCount(c *check, _ int, text string) *objection {
	n := c.count()
	if n.lack != "" {
		return object("", "cannot be read: want a whole number from 1")
	}
	if c.was(ContainerCount) {
		want, err := typedNumber(c.asked[ContainerCount][0])
		if err != nil || want.against(n) != 0 {
			return object(c.asked[ContainerCount][0], "was typed so")
		}
	}
	each, drug := c.get(ContainerVolume), c.get(DrugVolume)
	left := n.times(each).minus(drug)
	if left.lack != "" {
		return object("", left.lack)
	}
	if left.sign() < 0 {
		return object("", "so many containers hold less than drug.volume")
	}
	if !c.has(LeftVolume) && left.against(each) >= 0 {
		return object("", "one container less would do, and no left.volume is printed that says why")
	}
	return nil
}

func (c *check) exactLeft() value {
	return c.count().times(c.get(ContainerVolume)).minus(c.get(DrugVolume))
}

func leftVolume(c *check, _ int, r reading) *objection { return short(r, c.exactLeft()) }

func leftAmount(c *check, _ int, r reading) *objection {
	return short(r, c.exactLeft().times(c.exactStrength()))
}

func (c *check) exactSecond() value {
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
