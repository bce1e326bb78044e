package recheck

import "strconv"

// This file holds containers of several sizes against the record's own lines.

// packRows is the rows of the sizes, or why they cannot be taken: they count 1,
// 2, 3 without a gap.
func (c *check) packRows() ([]int, string) {
	for i, row := range c.packs {
		if row != i+1 {
			return nil, "needs " + Pack + "." + strconv.Itoa(i+1) + ", which is not printed"
		}
	}
	return c.packs, ""
}

// packsHold is the sum of count x volume of all sizes.
func (c *check) packsHold() value {
	return c.overPacks(func(row int) value {
		return c.countOf(Row(Pack, row, "count")).times(c.get(Row(Pack, row, "volume")))
	}, whole(0).ofKind(one(inVolume)))
}

func (c *check) overPacks(of func(row int) value, sum value) value {
	rows, lack := c.packRows()
	if lack != "" {
		return lacking(lack)
	}
	for _, row := range rows {
		sum = sum.plus(of(row))
	}
	return sum
}

// packsCounted holds container.count against the counts of all sizes.
func (c *check) packsCounted() *objection {
	sum := c.overPacks(func(row int) value { return c.countOf(Row(Pack, row, "count")) }, whole(0))
	if sum.lack != "" {
		return object("", sum.lack)
	}
	if sum.against(c.countOf(ContainerCount)) != 0 {
		return object(decimal(sum, 0), "the sizes counted together are")
	}
	return nil
}

// packPresentation is the id of a size in the record: the first that of
// container.amount, no other twice.
func packPresentation(c *check, row int, text string) *objection {
	for _, column := range []string{"amount", "volume", "count"} {
		if name := Row(Pack, row, column); !c.has(name) {
			return object("", "needs "+name+", which is not printed")
		}
	}
	if first := c.record.pack["id"]; row == 1 && text != first {
		return object(first, "container.amount is that of")
	}
	for _, other := range c.packs {
		if other != row && c.texts[Row(Pack, other, "presentation")] == text {
			return object("", "two rows are of this size")
		}
	}
	if _, problem := c.record.size(text); problem != "" {
		return object("", problem)
	}
	return nil
}

// packRecord is the lines of the presentation that a row names.
func (c *check) packRecord(row int) (record, string) {
	name := Row(Pack, row, "presentation")
	id, ok := c.texts[name]
	if !ok {
		return record{}, "needs " + name + ", which is not printed"
	}
	return c.record.size(id)
}

func packAmount(c *check, row int, r reading) *objection {
	size, problem := c.packRecord(row)
	if problem != "" {
		return object("", problem)
	}
	if o := exact(r, size.quantity("amount"), "the record says"); o != nil {
		return o
	}
	return c.ofOneStrength(row)
}

func packVolume(c *check, row int, r reading) *objection {
	size, problem := c.packRecord(row)
	if problem != "" {
		return object("", problem)
	}
	if o := exact(r, size.wholeVolume(), "the record says"); o != nil {
		return o
	}
	return c.ofOneStrength(row)
}

// ofOneStrength objects to a size whose strength is not that of the first.
func (c *check) ofOneStrength(row int) *objection {
	own, first := c.get(Row(Pack, row, "amount")).over(c.get(Row(Pack, row, "volume"))), c.exactStrength()
	if off := own.minus(first); off.lack != "" {
		return object("", off.lack)
	}
	if own.against(first) != 0 {
		return object("", "is of another strength than container.amount in container.volume")
	}
	return nil
}

// packCount is a whole number from 1, and one less of this size would not do.
func packCount(c *check, row int, text string) *objection {
	name := Row(Pack, row, "count")
	if o := c.typedCount(name, text); o != nil {
		return o
	}
	if !c.has(ContainerCount) {
		return object("", "needs "+ContainerCount+", which is not printed")
	}
	left, each := c.exactLeft(), c.get(Row(Pack, row, "volume"))
	if rest := left.minus(each); rest.lack != "" {
		return object("", rest.lack)
	}
	switch {
	case left.sign() < 0:
		return object("", "so many containers hold less than is drawn of them")
	case left.against(each) >= 0 && !c.was(ContainerCount):
		return object("", "one container less of this size would do")
	}
	return nil
}
