package recheck

import "fmt"

// This file holds the container against the formulary's own lines.

// recorded is the value of a line of the record, or what is lacking.
func (c *check) recorded(key string) value {
	text, problem := c.record.presentation(key)
	return typedLine(key, text, problem)
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
	text, problem := c.record.presentation("displacement")
	if problem == "" && text == "negligible" {
		return exact(r, whole(0).ofKind(one(inVolume)), "the record calls it negligible, so it is")
	}
	return exact(r, c.recorded("displacement"), "the record says")
}

func secondContainer(c *check, _ int, r reading) *objection {
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
