package quantity

import "math/big"

// A DropFactor is how many drops of a giving set make one mL, above zero.
type DropFactor struct {
	x    exact
	text string
}

// A DropRate is drops per minute, as they are counted by eye.
type DropRate struct {
	x    exact
	text string
}

const (
	wantDropFactor = `what is printed on the giving set, such as "20 drops/mL"`
	wantDropRate   = `drops by time such as "42 drops/min"`
)

// ParseDropFactor reads "20 drops/mL", as the pack of a giving set states it. It
// must be above zero. Errors are *SyntaxError.
func ParseDropFactor(s string) (DropFactor, error) { return settle(s, readDropFactor) }

func readDropFactor(s string) (DropFactor, error) {
	r, err := cut(s, wantDropFactor)
	if err != nil {
		return DropFactor{}, err
	}
	parts := slashParts(r.unit)
	if len(parts) != 2 || !isDrop(parts[0]) {
		return DropFactor{}, r.dropFault("mL")
	}
	scale, ok := volumeScale(parts[1])
	if !ok {
		return DropFactor{}, r.dropFault("mL")
	}
	if err := r.positive(); err != nil {
		return DropFactor{}, err
	}
	return DropFactor{x: r.x.quo(scale), text: r.text}, nil
}

// ParseDropRate reads "42 drops/min". It must be above zero. Errors are
// *SyntaxError.
func ParseDropRate(s string) (DropRate, error) { return settle(s, readDropRate) }

func readDropRate(s string) (DropRate, error) {
	r, err := cut(s, wantDropRate)
	if err != nil {
		return DropRate{}, err
	}
	parts := slashParts(r.unit)
	if len(parts) != 2 || !isDrop(parts[0]) {
		return DropRate{}, r.dropFault("min")
	}
	period, ok := periodNamed(parts[1])
	if !ok {
		return DropRate{}, r.dropFault("min")
	}
	if err := r.positive(); err != nil {
		return DropRate{}, err
	}
	return DropRate{x: r.x.mul(period.perHour()).quo(whole(60)), text: r.text}, nil
}

func isDrop(word string) bool { return word == "drop" || word == "drops" }

// dropFault refuses the unit and mends what was probably meant.
func (r reading) dropFault(per string) error {
	parts := slashParts(r.unit)
	likely := ""
	switch parts[0] {
	case "gtt", "gtts", "dr", "dps", "drp":
		if len(parts) == 2 && parts[1] == per {
			likely = r.number + " drops/" + per
		}
	case "drop", "drops":
		if len(parts) == 1 {
			likely = r.number + " drops/" + per
		}
	}
	if !isDrop(parts[0]) && !knownPart(parts[0]) {
		return r.fault(UnknownUnit, `the unit "`+r.unit+`" is not known here`, likely)
	}
	return r.fault(WrongUnit, `the unit "`+r.unit+`" does not fit here`, likely)
}

// DropsPerMinute is r drops a minute. A nil or negative r is not given.
func DropsPerMinute(r *big.Rat) DropRate { return DropRate{x: notNegative(r)} }

// Given reports whether there is a drop factor at all.
func (f DropFactor) Given() bool { return f.x.given() }

// Given reports whether there is a drop rate at all.
func (d DropRate) Given() bool { return d.x.given() }

// Rat is a copy of the exact drops in one mL; nil if nothing is given.
func (f DropFactor) Rat() *big.Rat { return f.x.copyRat() }

// Rat is a copy of the exact drops in a minute; nil if nothing is given.
func (d DropRate) Rat() *big.Rat { return d.x.copyRat() }

// Exact is the exact drops in one mL, written as [Amount.Exact] does.
func (f DropFactor) Exact() string { return f.x.text() }

// Exact is the exact drops in a minute, written as [Amount.Exact] does.
func (d DropRate) Exact() string { return d.x.text() }

// Drops is the drop rate that gives f through a set of factor n. Error:
// *NotGivenError.
func (f FlowRate) Drops(n DropFactor) (DropRate, error) {
	if !f.Given() || !n.x.positive() {
		return DropRate{}, &NotGivenError{What: "flow rate or drops in one mL"}
	}
	return DropRate{x: f.x.mul(n.x).quo(whole(60))}, nil
}

// Flow is the flow rate of d through a set of factor n. Error: *NotGivenError.
func (d DropRate) Flow(n DropFactor) (FlowRate, error) {
	if !d.Given() || !n.x.positive() {
		return FlowRate{}, &NotGivenError{What: "drop rate or drops in one mL"}
	}
	return FlowRate{x: d.x.quo(n.x).mul(whole(60))}, nil
}

// Counted is d in whole drops a minute, half up (rule R2), and what that
// changes in per cent of d. Error: *NotGivenError.
func (d DropRate) Counted() (DropRate, *big.Rat, error) {
	x, err := d.x.toStep(whole(1), HalfUp)
	if err != nil {
		return DropRate{}, nil, err
	}
	return DropRate{x: x}, lost(d.x, x), nil
}

// DropFactor is n in drops in one mL, by the SHORT rule.
func (s Style) DropFactor(n DropFactor) string { return s.drops(n.x, "/mL") }

// DropRate is d in drops a minute, by the SHORT rule.
func (s Style) DropRate(d DropRate) string { return s.drops(d.x, "/min") }

func (s Style) drops(x exact, per string) string {
	if !x.given() {
		return ""
	}
	word := " drops"
	if shorten(x).cmp(whole(1)) <= 0 {
		word = " drop"
	}
	return s.plain(x, word+per)
}
