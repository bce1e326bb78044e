package recheck

import (
	"fmt"
	"math/big"
)

// This file holds the container against the formulary's own lines.

// recorded is the value of a line of the record, or what is lacking.
func (c *check) recorded(key string) value { return c.record.quantity(key) }

// quantity is the value of a line of the presentation, or what is lacking.
func (r record) quantity(key string) value {
	text, problem := r.presentation(key)
	return typedLine(key, text, problem)
}

// wholeVolume is the volume of one container: as the record has it, or for a
// powder what is added and what the powder takes.
func (r record) wholeVolume() value {
	if r.holds("volume") || !r.holds("add") {
		return r.quantity("volume")
	}
	return r.quantity("add").plus(r.displacement())
}

// displacement is the volume that a powder takes; negligible is nothing.
func (r record) displacement() value {
	if text, problem := r.presentation("displacement"); problem == "" && text == "negligible" {
		return whole(0).ofKind(one(inVolume))
	}
	return r.quantity("displacement")
}

func typedLine(key, text, problem string) value {
	if problem != "" {
		return lacking(problem)
	}
	v, word, err := readTyped(text)
	if err != nil || word != "" {
		return lacking(fmt.Sprintf("the record's %s, %q, cannot be read", key, text))
	}
	return v
}

func containerAmount(c *check, _ int, r reading) *objection {
	if !r.whole.dim.isDrug() {
		return object("", "is not an amount of drug")
	}
	return exact(r, c.recorded("amount"), "the record says")
}

func containerVolume(c *check, _ int, r reading) *objection {
	bound := false
	if c.record.holds("volume") {
		bound = true
		if o := exact(r, c.recorded("volume"), "the record says"); o != nil {
			return o
		}
	}
	if c.has(PowderDisplaced) || c.record.holds("add") && !bound {
		bound = true
		if o := exact(r, c.get(PowderAdded).plus(c.get(PowderDisplaced)), "powder.added and powder.displaced together are"); o != nil {
			return o
		}
	}
	if !bound {
		return object("", c.recorded("volume").lack)
	}
	return nil
}

func strength(c *check, _ int, r reading) *objection { return short(r, c.exactStrength()) }

func powderAdded(c *check, _ int, r reading) *objection {
	return exact(r, c.recorded("add"), "the record says")
}

// powderDisplaced takes the record's own figure; where the record gives only
// the volume after mixing, the difference.
func powderDisplaced(c *check, _ int, r reading) *objection {
	if !c.record.holds("displacement") {
		return exact(r, c.recorded("volume").minus(c.recorded("add")), "the record's volume less its added fluid is")
	}
	return exact(r, c.record.displacement(), "the record says")
}

func secondContainer(c *check, _ int, r reading) *objection {
	if c.twoDrugs {
		return object("", "a second drug of the same container and one of another: no sum tells them apart")
	}
	return exact(r, c.recorded("second_amount"), "the record says")
}

func substanceFactor(c *check, _ int, r reading) *objection {
	text, problem := c.record.drug("substance")
	return exact(r, typedLine("substance", text, problem), "the record says")
}

// assay is what the record says; where it says nothing, the width that was
// assumed must be among what was asked.
func assay(c *check, _ int, r reading) *objection {
	if !c.record.holds("assay") && c.was(Assay) {
		return exact(r, c.typed(Assay), "was assumed, the record being silent, as")
	}
	return exact(r, c.recorded("assay"), "the record says")
}

// countOf is a printed number of containers or doses.
func (c *check) countOf(name string) value {
	text, ok := c.texts[name]
	if !ok {
		return lacking("needs " + name + ", which is not printed")
	}
	n, err := printedNumber(text)
	if err != nil || n.den.Cmp(big.NewInt(1)) != 0 || n.sign() == 0 {
		return lacking("needs " + name + ", which cannot be read")
	}
	return n
}

// typedCount objects to a text that is no whole number from 1, or another than
// was typed.
func (c *check) typedCount(name, text string) *objection {
	n := c.countOf(name)
	if n.lack != "" {
		return object("", "cannot be read: want a whole number from 1")
	}
	if c.was(name) {
		want, err := typedNumber(c.asked[name][0])
		if err != nil || want.against(n) != 0 {
			return object(c.asked[name][0], "was typed so")
		}
	}
	return nil
}

// held is the volume of all containers that are opened.
func (c *check) held() value {
	if len(c.packs) > 0 {
		return c.packsHold()
	}
	return c.countOf(ContainerCount).times(c.get(ContainerVolume))
}

func containerCount(c *check, _ int, text string) *objection {
	if o := c.typedCount(ContainerCount, text); o != nil {
		return o
	}
	if len(c.packs) > 0 {
		return c.packsCounted()
	}
	return c.spare(ContainerVolume, LeftVolume, c.held().minus(c.drawn()))
}

// spare objects to containers that hold too little, and to one too many unless
// what is left of them is printed.
func (c *check) spare(volume, leftName string, left value) *objection {
	each := c.get(volume)
	if rest := left.minus(each); rest.lack != "" {
		return object("", rest.lack)
	}
	if left.sign() < 0 {
		return object("", "so many containers hold less than is drawn of them")
	}
	if !c.has(leftName) && left.against(each) >= 0 {
		return object("", "one container less would do, and no "+leftName+" is printed that says why")
	}
	return nil
}

func (c *check) exactLeft() value { return c.held().minus(c.drawn()) }

func leftVolume(c *check, _ int, r reading) *objection { return short(r, c.exactLeft()) }

func leftAmount(c *check, _ int, r reading) *objection {
	return short(r, c.exactLeft().times(c.exactStrength()))
}
