// Package lint holds a text against the rules N01 to N28 of numbers, units and
// names (rule R14): what is known to be misread on a label, a sheet or a
// screen. It imports nothing of this project, so that a fault of the number
// printer cannot hide itself.
//
// The rules come from lists that contradict each other in places: microgram or
// mcg, comma or blank between thousands. A [House] settles each of these, never
// chance.
package lint

import (
	"slices"
	"strings"
)

// A Severity says what a finding means for print. Its zero value is invalid.
type Severity int

// Severities.
const (
	Stop Severity = iota + 1 // must not be printed
	Warn                     // may be printed; a person should look
)

func (s Severity) String() string {
	switch s {
	case Stop:
		return "stop"
	case Warn:
		return "warn"
	}
	return "severity not set"
}

// A Scope says what has to be seen to judge a rule. Its zero value is invalid.
type Scope int

// Scopes.
const (
	EveryText Scope = iota + 1 // any text by itself, whoever wrote it
	// ChosenFigure is a figure that a person chose. What the tool works out is
	// printed as the sum gives it: rounded once, in a named step (rule R2), and
	// a dose stays in the unit in which it was ordered, to be held against the
	// order.
	ChosenFigure
	WholeLabel // all lines of one label or card together
	OnPaper    // the page itself; Rule.Held names what holds the rule there
)

// A Rule is one rule of numbers, units and names.
type Rule struct {
	Code     string // "N01"
	Fault    string // what is wrong, without a digit: "no blank between number and unit"
	Says     string // what to write
	Source   string // spelled out
	Severity Severity
	Scope    Scope
	Held     string // for OnPaper: what holds it
	// Wrong and Right are examples in house style uk, each of them tested. Of
	// a rule of WholeLabel the lines are parted by "|", the drug's name first.
	Wrong, Right []string

	find func(h House, text string) []match
	look func(h House, drug string, lines []string) []match
}

// A match is one place of a text that breaks a rule. fix stands for it where
// one is certain; more is set where this one is graver or lighter than the rule.
type match struct {
	from, to int
	fix      string
	more     Severity
}

// A Finding is one place in a text that breaks a rule.
type Finding struct {
	Rule     Rule
	Severity Severity
	At       int    // byte of the text where Got begins
	Got      string // the faulty part
	Fix      string // what stands for it; "" where none is certain
}

// Rules lists all rules in the order of their codes.
func Rules() []Rule { return slices.Clone(rules) }

// rules is the list, made once.
var rules = func() []Rule {
	all := slices.Concat(numberRules(), digitRules(), unitRules(), placeRules(), strengthRules(), wordRules())
	slices.SortStableFunc(all, func(a, b Rule) int { return strings.Compare(a.Code, b.Code) })
	return all
}()

// Lookup finds a rule by its code.
func Lookup(code string) (Rule, bool) {
	for _, r := range rules {
		if r.Code == code {
			return r, true
		}
	}
	return Rule{}, false
}

// Printed is what a text that the tool prints breaks, in the order of the text:
// the rules of [EveryText].
func (h House) Printed(text string) []Finding { return h.text(text, EveryText) }

// Typed is what a text that a person wrote breaks, in the order of the text:
// the rules of [EveryText] and [ChosenFigure].
func (h House) Typed(text string) []Finding { return h.text(text, EveryText, ChosenFigure) }

func (h House) text(text string, scopes ...Scope) []Finding {
	var out []Finding
	for _, r := range rules {
		if r.find == nil || !slices.Contains(scopes, r.Scope) {
			continue
		}
		for _, m := range r.find(h, text) {
			out = append(out, finding(r, m, text))
		}
	}
	slices.SortStableFunc(out, func(a, b Finding) int { return a.At - b.At })
	return out
}

// Whole is what the lines of one label or card break taken together: the rules
// of [WholeLabel]. drug is the drug's name, which need not stand among lines.
// Got of these findings is a part of the lines joined by line ends.
func (h House) Whole(drug string, lines []string) []Finding {
	var out []Finding
	for _, r := range rules {
		if r.look == nil {
			continue
		}
		for _, m := range r.look(h, drug, lines) {
			out = append(out, finding(r, m, strings.Join(lines, "\n")))
		}
	}
	return out
}

func finding(r Rule, m match, text string) Finding {
	f := Finding{Rule: r, Severity: r.Severity, At: m.from, Got: text[m.from:m.to], Fix: m.fix}
	if m.more != 0 {
		f.Severity = m.more
	}
	return f
}

// Fixed is the text as the house writes it: every certain fix of the rules of
// [EveryText] put in, and whether nothing of them is left to find.
func (h House) Fixed(text string) (fixed string, whole bool) {
	const rounds = 4 // one fix may show the next: "2.50mg", "2.5mg", "2.5 mg"
	for range rounds {
		found := h.Printed(text)
		next := put(text, found)
		if next == text {
			return text, len(found) == 0
		}
		text = next
	}
	return text, len(h.Printed(text)) == 0
}

// put is the text with the fixes put in. Where two overlap the first one wins.
func put(text string, found []Finding) string {
	var b strings.Builder
	at := 0
	for _, f := range found {
		if f.Fix == "" || f.At < at {
			continue
		}
		b.WriteString(text[at:f.At])
		b.WriteString(f.Fix)
		at = f.At + len(f.Got)
	}
	b.WriteString(text[at:])
	return b.String()
}
