package quantity

import (
	"math/big"
	"strings"
)

// A Duration is a span of time, never negative. Its zero value means that
// nobody has given one.
type Duration struct {
	x    exact // in minutes
	text string
}

const wantDuration = `a time such as "6 h", "90 min" or "1 h 30 min"`

// timeLadder is days to seconds in minutes.
func timeLadder() ladder {
	return ladder{
		{"day", "days", []string{"d"}, nil, whole(1440), false},
		{"h", "h", []string{"hr", "hour", "hours"}, []string{"hrs"}, whole(60), false},
		{"min", "min", []string{"minute", "minutes", "mins"}, nil, whole(1), false},
		{"second", "seconds", []string{"s"}, []string{"sec", "secs"}, fraction(1, 60), false},
	}
}

// ParseDuration reads a span of time above zero: "6 h", "90 min", "1.5 h", "2
// days", "30 seconds", "1 h 30 min". Of two units the larger stands first, is
// whole, and the smaller is less than one of it. Errors are *SyntaxError.
func ParseDuration(s string) (Duration, error) { return settle(s, readDuration) }

func readDuration(s string) (Duration, error) {
	text, l := clean(s), timeLadder()
	r := reading{got: s, text: text, want: wantDuration}
	switch {
	case text == "":
		return Duration{}, r.fault(EmptyText, "nothing is there", "")
	case strings.Contains(text, ":"):
		return Duration{}, r.fault(BadNumber, "a time of day is not a span of time", clockSpan(text))
	case !l.owns(text):
		one, err := cut(s, wantDuration)
		if err != nil {
			return Duration{}, err
		}
		return Duration{}, one.unitFault()
	}
	x, err := l.total(s, wantDuration)
	if err != nil {
		return Duration{}, err
	}
	return Duration{x: x, text: text}, nil
}

// clockSpan takes "6:30" for hours and minutes.
func clockSpan(text string) string {
	h, m, _ := strings.Cut(text, ":")
	if !allDigits(h) || !plainNumber(h) || len(m) != 2 || !allDigits(m) {
		return ""
	}
	if m = strings.TrimPrefix(m, "0"); m == "0" {
		return h + " h"
	}
	return h + " h " + m + " min"
}

// Minutes is a span of r minutes. A nil or negative r is not given.
func Minutes(r *big.Rat) Duration { return Duration{x: notNegative(r)} }

// Given reports whether there is a span at all.
func (d Duration) Given() bool { return d.x.given() }

// Written is the text that the span was read from, blanks put in order; "" for a
// worked value.
func (d Duration) Written() string { return d.text }

// Rat is a copy of the exact value in minutes; nil if nothing is given.
func (d Duration) Rat() *big.Rat { return d.x.copyRat() }

// Exact is the exact span in minutes, written as [Amount.Exact] does.
func (d Duration) Exact() string { return d.x.text() }

// Duration is d in hours and minutes, rounded down to whole minutes, so that
// paper never promises time that is not there; under an hour in minutes and
// whole seconds.
func (s Style) Duration(d Duration) string {
	if s.name == "" || !d.x.given() {
		return ""
	}
	large, small, per := " h", " min", whole(60)
	units := d.x
	if d.x.cmp(per) < 0 {
		large, small, units = " min", " s", d.x.mul(per)
	}
	n := units.floorDiv(whole(1))
	big60 := big.NewInt(60)
	rest := new(big.Int).Mod(n, big60)
	n.Div(n, big60)
	var out []string
	if n.Sign() > 0 {
		out = append(out, s.group(n.String())+large)
	}
	if rest.Sign() > 0 || n.Sign() == 0 {
		out = append(out, rest.String()+small)
	}
	return strings.Join(out, " ")
}

// Over is the flow rate that gives v in the span t. Errors: *NotGivenError, also
// for a span of nothing.
func (v Volume) Over(t Duration) (FlowRate, error) {
	if !v.Given() || !t.x.positive() {
		return FlowRate{}, &NotGivenError{What: "volume or time"}
	}
	return FlowRate{x: v.x.quo(t.x).mul(whole(60))}, nil
}

// Lasts is how long v lasts at flow f, exact. Errors: *NotGivenError, also for a
// flow of nothing.
func (v Volume) Lasts(f FlowRate) (Duration, error) {
	if !v.Given() || !f.x.positive() {
		return Duration{}, &NotGivenError{What: "volume or flow rate"}
	}
	return Duration{x: v.x.quo(f.x).mul(whole(60))}, nil
}

// During is the volume that f gives in the span t. Error: *NotGivenError.
func (f FlowRate) During(t Duration) (Volume, error) {
	if !f.Given() || !t.Given() {
		return Volume{}, &NotGivenError{What: "flow rate or time"}
	}
	return Volume{x: f.x.mul(t.x).quo(whole(60))}, nil
}

// During is the dose that d gives in the span t, counted per what d is and
// written in its unit. Error: *NotGivenError.
func (d DoseRate) During(t Duration) (Dose, error) {
	if !d.Given() || !t.Given() {
		return Dose{}, &NotGivenError{What: "dose rate or time"}
	}
	return Dose{x: d.x.mul(t.x).quo(whole(60)), kind: d.kind, basis: d.basis, unit: d.unit}, nil
}

// Plus is d + e in the unit of d. Errors: *KindError if they are counted in
// unlike ways or one is not given; *BasisError.
func (d Dose) Plus(e Dose) (Dose, error) {
	if err := sameKind(d.kind, e.kind); err != nil {
		return Dose{}, err
	}
	if d.basis != e.basis {
		return Dose{}, &BasisError{Got: e.basis, Want: d.basis}
	}
	return Dose{x: d.x.add(e.x), kind: d.kind, basis: d.basis, unit: d.unit}, nil
}

// AsDose is the amount as an absolute dose; not given if a is not.
func (a Amount) AsDose() Dose {
	if !a.Given() {
		return Dose{}
	}
	return Dose{x: a.x, kind: a.kind, basis: Absolute, unit: a.unit, text: a.text}
}
