// Package gs1 writes and reads GS1 element strings for the barcode of a label:
// which application identifiers there are, what their values may hold, where a
// separator must stand, and how the whole reads for a person.
//
// Source of the rules: GS1 syntax dictionary, 2026-07-27 (Apache-2.0), entries
// 01, 10, 17, 21, 7003 and 91 to 99; GS1 General Specifications, figure of the
// 82 signs. Only these identifiers are known here. 91 to 99 are for a
// company's own use, may stand alone and mean nothing outside it; no number is
// invented under 01.
package gs1

import (
	"fmt"
	"strings"
)

// Separator is FNC1 as the byte that the symbol encoder takes for it. It leads
// every symbol and ends every value that has no predefined length, except the
// last.
const Separator = 0xE8

// An Element is one application identifier with its value.
type Element struct{ AI, Value string }

// A rule says what one identifier may hold.
type rule struct {
	shortest, longest int
	digits            bool // digits only, else the 82 signs
	separated         bool // needs a separator when something follows
	needsGTIN         bool // only beside 01
	more              func(value string) error
}

// ruleOf is the table of identifiers.
func ruleOf(ai string) (rule, bool) {
	switch ai {
	case "01":
		return rule{shortest: 14, longest: 14, digits: true, more: checkGTIN}, true
	case "10", "21":
		return rule{shortest: 1, longest: 20, separated: true, needsGTIN: true}, true
	case "17":
		return rule{shortest: 6, longest: 6, digits: true, needsGTIN: true, more: checkDate}, true
	case "7003":
		return rule{shortest: 10, longest: 10, digits: true, separated: true, needsGTIN: true, more: checkMoment}, true
	case "91", "92", "93", "94", "95", "96", "97", "98", "99":
		return rule{shortest: 1, longest: 90, separated: true}, true
	}
	return rule{}, false
}

// Encode checks the elements and gives the bytes for the symbol, with the
// leading Separator and those between, and the human-readable form, in which
// each identifier stands in parentheses. Errors name the identifier.
func Encode(elements []Element) (symbol []byte, hri string, err error) {
	if err := Check(elements); err != nil {
		return nil, "", err
	}
	symbol = []byte{Separator}
	var read strings.Builder
	for i, e := range elements {
		r, _ := ruleOf(e.AI) // known, or Check had refused it
		symbol = append(symbol, e.AI+e.Value...)
		if r.separated && i < len(elements)-1 {
			symbol = append(symbol, Separator)
		}
		fmt.Fprintf(&read, "(%s)%s", e.AI, e.Value)
	}
	// A value may hold parentheses; one that reads like an identifier would
	// make the human-readable form say something else than the symbol.
	again := split(read.String())
	if len(again) != len(elements) {
		return nil, "", fmt.Errorf("got a value that reads like an identifier in %q, want one that does not", read.String())
	}
	return symbol, read.String(), nil
}

// Parse takes the human-readable form apart and checks it as Encode does. It
// wants exactly what Encode writes: no blanks, nothing before the first
// identifier.
func Parse(hri string) ([]Element, error) {
	elements := split(hri)
	if len(elements) == 0 {
		return nil, fmt.Errorf("got %q, want an identifier in parentheses first", hri)
	}
	if err := Check(elements); err != nil {
		return nil, err
	}
	return elements, nil
}

// split cuts at every known identifier in parentheses; nil when the text does
// not begin with one.
func split(hri string) []Element {
	var out []Element
	for len(hri) > 0 {
		ai := leading(hri)
		if ai == "" {
			return nil
		}
		hri = hri[len(ai)+2:]
		end := 0
		for end < len(hri) && leading(hri[end:]) == "" {
			end++
		}
		out = append(out, Element{ai, hri[:end]})
		hri = hri[end:]
	}
	return out
}

// leading is the known identifier in parentheses with which s begins.
func leading(s string) string {
	for _, n := range []int{2, 4} {
		if len(s) >= n+2 && s[0] == '(' && s[n+1] == ')' {
			if _, ok := ruleOf(s[1 : n+1]); ok {
				return s[1 : n+1]
			}
		}
	}
	return ""
}

// Check says what is wrong with the elements, nil if nothing is: identifiers
// known and each once, values of the right length and signs, and those that
// describe a trade item only beside its number (01).
func Check(elements []Element) error {
	if len(elements) == 0 {
		return fmt.Errorf("got no element, want one or more")
	}
	seen := map[string]bool{}
	for _, e := range elements {
		if seen[e.AI] {
			return fmt.Errorf("(%s): got it twice, want it once", e.AI)
		}
		seen[e.AI] = true
	}
	for _, e := range elements {
		r, ok := ruleOf(e.AI)
		if !ok {
			return fmt.Errorf("got identifier %q, want one of 01 10 17 21 7003 91 to 99", e.AI)
		}
		if err := r.check(e.Value); err != nil {
			return fmt.Errorf("(%s): %w", e.AI, err)
		}
		if r.needsGTIN && !seen["01"] {
			return fmt.Errorf("(%s): got no (01) beside it, want one: it describes a trade item", e.AI)
		}
	}
	return nil
}

func (r rule) check(value string) error {
	if len(value) < r.shortest || len(value) > r.longest {
		return fmt.Errorf("got %q of %d signs, want %d to %d", value, len(value), r.shortest, r.longest)
	}
	for _, c := range value {
		if r.digits && (c < '0' || c > '9') {
			return fmt.Errorf("got %q in %q, want digits", c, value)
		}
		if !inSet(c) {
			return fmt.Errorf("got %q in %q, want one of the 82 signs", c, value)
		}
	}
	if r.more == nil {
		return nil
	}
	return r.more(value)
}

// inSet says whether c is one of the 82 signs that a value may hold.
func inSet(c rune) bool {
	switch {
	case c >= '0' && c <= '9', c >= 'A' && c <= 'Z', c >= 'a' && c <= 'z':
		return true
	}
	return c != 0 && strings.ContainsRune(`!"%&'()*+,-./:;<=>?_`, c)
}
