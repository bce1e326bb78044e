package recheck

import (
	"slices"
	"strings"
)

// This file holds the second drug of a syringe against its own record and sums.

// otherDrug is the second drug's name as its record files it; the order names it,
// or one of the names in its block.
func otherDrug(c *check, _ int, text string) *objection {
	switch {
	case c.other.problem != "":
		return object("", c.other.problem)
	case text != c.otherName:
		return object(c.otherName, "the second record is that of")
	case text == c.drug:
		return object("", "is the first drug as well")
	case !c.was(OtherDrug):
		return object("", "is not among what was typed, and no sum could confirm it")
	}
	typed := strings.TrimSpace(c.asked[OtherDrug][0])
	names, _ := c.other.place.texts()
	if !slices.ContainsFunc(append(names, text), func(n string) bool { return strings.EqualFold(n, typed) }) {
		return object(typed, "was typed so")
	}
	return nil
}

func otherContainerAmount(c *check, _ int, r reading) *objection {
	if !r.whole.dim.isDrug() {
		return object("", "is not an amount of drug")
	}
	if !c.has(OtherDrug) {
		return object("", "needs "+OtherDrug+", which is not printed")
	}
	return exact(r, c.other.quantity("amount"), "the second record says")
}

func otherContainerVolume(c *check, _ int, r reading) *objection {
	return exact(r, c.other.wholeVolume(), "the second record says")
}

func (c *check) exactOtherStrength() value {
	return c.once(OtherStrength, func() value { return c.get(OtherContainerAmount).over(c.get(OtherContainerVolume)) })
}

// exactOther is the amount of the second drug in the syringe.
func (c *check) exactOther() value { return c.get(OtherVolume).times(c.exactOtherStrength()) }

func otherStrength(c *check, _ int, r reading) *objection { return short(r, c.exactOtherStrength()) }
func otherAmount(c *check, _ int, r reading) *objection   { return short(r, c.exactOther()) }

func (c *check) otherHeld() value {
	return c.countOf(OtherContainerCount).times(c.get(OtherContainerVolume))
}

func otherContainerCount(c *check, _ int, text string) *objection {
	if o := c.typedCount(OtherContainerCount, text); o != nil {
		return o
	}
	return c.spare(OtherContainerVolume, OtherLeftVolume, c.exactOtherLeft())
}

func (c *check) exactOtherLeft() value { return c.otherHeld().minus(c.get(OtherVolume)) }

func otherLeftVolume(c *check, _ int, r reading) *objection { return short(r, c.exactOtherLeft()) }

func otherLeftAmount(c *check, _ int, r reading) *objection {
	return short(r, c.exactOtherLeft().times(c.exactOtherStrength()))
}

// otherVolume holds what is drawn of the second drug against everything in the
// order that says how much of it the syringe must hold.
func otherVolume(c *check, _ int, r reading) *objection {
	if o := c.graduated(r, OtherStep); o != nil {
		return o
	}
	bound := false
	for _, name := range []string{OtherAmount, SecondAmount, SecondConcentrated} {
		if !c.was(name) {
			continue
		}
		bound = true
		want, step := c.otherWanted(name), c.get(OtherStep)
		if want.lack != "" {
			return object("", want.lack)
		}
		if want.dim != r.whole.dim {
			return object("", "what was asked as "+name+" is of another kind than the second container holds")
		}
		if !roundsTo(r.whole, want, step, halfUp) {
			return object(nearest(want, step, halfUp, r.unit), "from the "+name+" asked")
		}
	}
	switch {
	case c.was(OtherVolume):
		return exact(r, c.typed(OtherVolume), "typed as")
	case bound:
		return nil
	case c.was(OtherContainerCount):
		return exact(r, c.otherHeld(), "whole containers hold")
	}
	return object("", "nothing in the order says how much of the second drug to draw")
}

// otherWanted is the exact volume of the second drug that an asked amount or
// concentration of it needs.
func (c *check) otherWanted(name string) value {
	asked, stock := c.typed(name), c.exactOtherStrength()
	if name != SecondConcentrated {
		return asked.over(stock)
	}
	if c.texts[Method] == makeUpTo {
		return asked.times(c.get(FinalVolume)).over(stock)
	}
	// C = S d / (rest + d), so d (S - C) = C rest.
	return asked.times(c.get(FinalVolume).minus(c.get(OtherVolume))).over(stock.minus(asked))
}
