package gs1

import (
	"sort"
	"strings"
)

//go:generate go run ./generate

// An entry is one line of the dictionary: one identifier, or a range of them
// that differ in the last digit.
type entry struct {
	low, high  string
	predefined bool // its length is known from its first digits: no separator after it
	parts      []component
	requires   []string // every one must be met: "01+21,02" is 01 with 21, or else 02
	excludes   []string // none may stand beside it: "255", "310n"
	title      string
}

// A component is a piece of a value. Only the last may vary in length, and only
// the last ones may be absent.
type component struct {
	set               set
	shortest, longest int
	optional          bool
	checks            []string // names of the dictionary's checkers
}

// find is the entry of an identifier; nil when there is none. The table is
// sorted.
func find(ai string) *entry {
	at := sort.Search(len(table), func(i int) bool { return table[i].low > ai }) - 1
	if at < 0 || len(ai) != len(table[at].low) || ai > table[at].high {
		return nil
	}
	return &table[at]
}

// Title is the dictionary's short title of an identifier, "USE BY or EXPIRY";
// "" for an unknown one.
func Title(ai string) string {
	if e := find(ai); e != nil {
		return e.title
	}
	return ""
}

// span is the least and the greatest length of a value.
func (e *entry) span() (shortest, longest int) {
	for _, p := range e.parts {
		if !p.optional {
			shortest += p.shortest
		}
		longest += p.longest
	}
	return shortest, longest
}

// digits says whether a value holds nothing but digits.
func (e *entry) digits() bool {
	for _, p := range e.parts {
		if p.set != numeric {
			return false
		}
	}
	return true
}

// matches says whether an identifier is the one that a pattern names, in which
// n stands for any digit.
func matches(ai, pattern string) bool {
	if len(ai) != len(pattern) {
		return false
	}
	for i := range ai {
		if pattern[i] != 'n' && pattern[i] != ai[i] {
			return false
		}
	}
	return true
}

// among says whether one of the elements has an identifier of the pattern.
func among(elements []Element, pattern string) bool {
	for _, e := range elements {
		if matches(e.AI, pattern) {
			return true
		}
	}
	return false
}

// met says whether a requirement is met: one of its alternatives, all of it.
func met(elements []Element, requirement string) bool {
	for alternative := range strings.SplitSeq(requirement, ",") {
		all := true
		for pattern := range strings.SplitSeq(alternative, "+") {
			all = all && among(elements, pattern)
		}
		if all {
			return true
		}
	}
	return false
}
