package recheck

import (
	"strconv"
	"strings"
	"time"
)

// The two ways in which a date and time is printed: UK style, and the style of
// the US and SI sheets.
const (
	dayMonth  = "02 Jan 2006 15:04"
	yearFirst = "2006-01-02 15:04"
)

// readMoment reads a printed date and time as if at offset zero. Writing it
// again must give the same text, so nothing half-read passes.
func readMoment(text string) (time.Time, bool) {
	for _, layout := range []string{dayMonth, yearFirst} {
		t, err := time.Parse(layout, text)
		if err == nil && t.Format(layout) == text {
			return t, true
		}
	}
	return time.Time{}, false
}

// momentFault objects to a text that is no date and time, or that is in another
// style than the other moments of the same syringe: a site has one style.
func (c *check) momentFault(text string) *objection {
	if _, ok := readMoment(text); !ok {
		return object("", "cannot be read as a date and time")
	}
	for _, name := range []string{Prepared, UseBy, IntermediateUseBy, EmptyAt} {
		if other, ok := c.texts[name]; ok && isYearFirst(other) != isYearFirst(text) {
			return object("", "is in another style than "+name)
		}
	}
	return nil
}

func isYearFirst(text string) bool { return len(text) > 4 && text[4] == '-' }

// readOffset reads "+01:00" in minutes. "-00:00" does not exist.
func readOffset(text string) (int64, bool) {
	if len(text) != 6 || (text[0] != '+' && text[0] != '-') || text[3] != ':' || !digitsOnly(text[1:3]+text[4:]) {
		return 0, false
	}
	hours, err := strconv.Atoi(text[1:3])
	minutes, fault := strconv.Atoi(text[4:])
	if err != nil || fault != nil || hours > 14 || minutes > 59 || text == "-00:00" {
		return 0, false
	}
	total := int64(hours)*60 + int64(minutes)
	if text[0] == '-' {
		total = -total
	}
	return total, true
}

// instant is the absolute minute of a printed date and offset (rule R18).
func (c *check) instant(name, offset string) (int64, string) {
	for _, n := range []string{name, offset} {
		if !c.has(n) {
			return 0, "needs " + n + ", which is not printed"
		}
	}
	t, ok := readMoment(c.texts[name])
	if !ok {
		return 0, "needs " + name + ", which cannot be read"
	}
	minutes, ok := readOffset(c.texts[offset])
	if !ok {
		return 0, "needs " + offset + ", which cannot be read"
	}
	return t.Unix()/60 - minutes, ""
}

// spanMinutes reads "24 h", "30 min" or "1 h 30 min" as printed. A span of
// nothing is no span.
func spanMinutes(text string) (value, bool) {
	minutes, ok := readRun(text)
	return minutes, ok && minutes.sign() > 0
}

// spans says whether a span reaches from one instant to the other.
func (c *check) spans(fromName, fromOffset, toName, toOffset string, minutes value) *objection {
	from, lack := c.instant(fromName, fromOffset)
	if lack != "" {
		return object("", lack)
	}
	to, lack := c.instant(toName, toOffset)
	if lack != "" {
		return object("", lack)
	}
	want := whole(from).plus(minutes.bare(one(inTime)))
	if want.lack != "" {
		return object("", want.lack)
	}
	if want.against(whole(to)) != 0 {
		late := whole(to).minus(want)
		return object("", "is "+decimal(late, 0)+" min after the end of the span that is printed (below zero: before it)")
	}
	return nil
}

// useBy is the rule of a use-by: prepared and so many hours, absolute.
func useBy(hours, until, offset string) rule {
	return func(c *check, _ int, text string) *objection {
		if o := c.momentFault(text); o != nil {
			return o
		}
		span, ok := c.texts[hours]
		if !ok {
			return object("", "needs "+hours+", which is not printed")
		}
		minutes, ok := spanMinutes(span)
		if !ok {
			return object("", "needs "+hours+", which cannot be read as hours and minutes")
		}
		return c.spans(Prepared, PreparedOffset, until, offset, minutes)
	}
}

// partOf is for a figure that another figure's sum takes in exactly: where that
// one is printed it confirms both, else the figure must have been typed.
func (c *check) partOf(name, text string, wholes ...string) *objection {
	if c.was(name) {
		return c.sameText(name, text)
	}
	for _, w := range wholes {
		if c.has(w) {
			return nil
		}
	}
	return object("", "was not typed, and "+strings.Join(wholes, " or ")+", whose sum takes it in, is not printed")
}

func prepared(c *check, _ int, text string) *objection {
	if o := c.momentFault(text); o != nil {
		return o
	}
	if c.was(Prepared) {
		return sameMoment(c.asked[Prepared][0], text)
	}
	return c.partOf(Prepared, text, UseBy, IntermediateUseBy, EmptyAt)
}

// sameMoment compares a printed moment with the typed one, whichever of the
// two printed styles it was typed in.
func sameMoment(typed, text string) *objection {
	want, ok := readMoment(typed)
	got, known := readMoment(text)
	if !ok || !known || !want.Equal(got) {
		return object(typed, "was typed so")
	}
	return nil
}

// offsetOf is the rule of an offset, which the sum of one of the moments takes in.
func offsetOf(name string, moments ...string) rule {
	return func(c *check, _ int, text string) *objection {
		if _, ok := readOffset(text); !ok {
			return object("", "cannot be read as an offset")
		}
		return c.partOf(name, text, moments...)
	}
}

// useHours is the rule of the span until a use-by.
func useHours(name, until string) rule {
	return func(c *check, _ int, text string) *objection {
		minutes, ok := spanMinutes(text)
		if !ok {
			return object("", "cannot be read as hours and minutes")
		}
		if !c.was(name) {
			return c.partOf(name, text, until)
		}
		return exact(spanReading(minutes), c.typedSpan(name), "typed as")
	}
}

// typedSpan is a span as typed, in hours and minutes or as one quantity.
func (c *check) typedSpan(name string) value {
	if c.was(name) {
		if minutes, ok := spanMinutes(c.asked[name][0]); ok {
			return minutes
		}
	}
	return c.typed(name)
}

// spanReading is a span of minutes as a reading in minutes.
func spanReading(minutes value) reading {
	return reading{number: minutes.bare(one(inTime)), unit: whole(1).ofKind(one(inTime)), whole: minutes}
}

// readRun reads "9 h 25 min", "9 h" or "45 min" in minutes; an hour is never
// written as 60 min, and a part that is nothing is not written.
func readRun(text string) (value, bool) {
	words := strings.Split(text, " ")
	if len(words) != 2 && len(words) != 4 {
		return value{}, false
	}
	total := whole(0)
	if words[1] == "h" {
		hours, err := printedNumber(words[0])
		if err != nil || hours.sign() == 0 || !hours.isMultiple(whole(1)) {
			return value{}, false
		}
		total = hours.times(whole(60))
		words = words[2:]
		if len(words) == 0 {
			return total.ofKind(one(inTime)), true
		}
	}
	if len(words) != 2 || words[1] != "min" {
		return value{}, false
	}
	minutes, err := printedNumber(words[0])
	if err != nil || !minutes.isMultiple(whole(1)) || minutes.against(whole(60)) >= 0 {
		return value{}, false
	}
	if minutes.sign() == 0 && total.sign() != 0 {
		return value{}, false
	}
	return total.plus(minutes).ofKind(one(inTime)), true
}

// runTime is the final volume over the start rate, whole minutes, down.
func runTime(c *check, _ int, text string) *objection {
	return c.lasts(text, c.get(FinalVolume))
}

// usableTime is the same of what reaches the patient at the set rate.
func usableTime(c *check, _ int, text string) *objection {
	return c.lasts(text, c.usableVolume())
}

// lasts holds a span against a volume over the start rate.
func (c *check) lasts(text string, volume value) *objection {
	minutes, ok := readRun(text)
	if !ok {
		return object("", "cannot be read as hours and minutes")
	}
	return onStep(spanReading(minutes), volume.over(c.get(StartRate)), whole(1).ofKind(one(inTime)), downward)
}

// usableVolume is final.volume less what fills the line and what stays behind.
func (c *check) usableVolume() value {
	left := c.get(FinalVolume)
	for _, name := range []string{Priming, DeadSpace} {
		switch {
		case c.has(name):
			left = left.minus(c.get(name))
		case c.was(name):
			return lacking("needs " + name + ", which was typed, yet is not printed")
		}
	}
	if left.lack == "" && left.sign() <= 0 {
		return lacking("priming and dead.space leave nothing of final.volume")
	}
	return left
}

// wantedTime is as typed, and the syringe lasts that long.
func wantedTime(c *check, _ int, text string) *objection {
	minutes, ok := spanMinutes(text)
	if !ok {
		return object("", "cannot be read as hours and minutes")
	}
	if o := exact(spanReading(minutes), c.typedSpan(WantedTime), "typed as"); o != nil {
		return o
	}
	usable, ok := readRun(c.texts[UsableTime])
	if !ok {
		return object("", "needs usable.time, which is not printed or cannot be read")
	}
	if usable.against(minutes) < 0 {
		return object("", "usable.time is less")
	}
	return nil
}

func emptyAt(c *check, _ int, text string) *objection {
	if o := c.momentFault(text); o != nil {
		return o
	}
	name := RunTime
	if c.has(UsableTime) {
		name = UsableTime
	}
	run, ok := c.texts[name]
	if !ok {
		return object("", "needs "+name+", which is not printed")
	}
	minutes, ok := readRun(run)
	if !ok {
		return object("", "needs "+name+", which cannot be read")
	}
	offset := EmptyOffset
	if !c.has(EmptyOffset) {
		offset = PreparedOffset
		if c.was(EmptyOffset) { // the clocks change before it is empty
			c.texts[EmptyOffset] = c.asked[EmptyOffset][0]
			defer delete(c.texts, EmptyOffset)
			offset = EmptyOffset
		}
	}
	return c.spans(Prepared, PreparedOffset, EmptyAt, offset, minutes)
}
