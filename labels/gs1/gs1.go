// Package gs1 writes and reads GS1 element strings for the barcode of a label
// or a pack: which application identifiers there are, what their values may
// hold, which need or exclude one another, where a separator must stand, and
// how the whole reads for a person.
//
// Source of the rules: the GS1 Barcode Syntax Dictionary (Apache-2.0), copied
// into dictionary/ and turned into a table by go generate. 91 to 99 are for a
// company's own use, may stand alone and mean nothing outside it; no number is
// invented under 01.
//
// Lengths, signs, check digits, days, times, needs and exclusions are judged.
// Lists of countries, currencies, packages and media, coupons, bank accounts,
// places on the globe and company prefixes are not (see unjudged): no medicine's
// code hangs on them.
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

// Encode checks the elements and gives the bytes for the symbol, with the
// leading Separator and those between, and the human-readable form, in which
// each identifier stands in parentheses. Its error is a Fault.
func Encode(elements []Element) (symbol []byte, hri string, err error) {
	if err := Check(elements); err != nil {
		return nil, "", err
	}
	symbol = []byte{Separator}
	var read strings.Builder
	for i, e := range elements {
		symbol = append(symbol, e.AI+e.Value...)
		if i < len(elements)-1 && !find(e.AI).predefined { // known, or Check had refused it
			symbol = append(symbol, Separator)
		}
		fmt.Fprintf(&read, "(%s)%s", e.AI, e.Value)
	}
	// A value may hold parentheses; one that reads like an identifier would
	// make the human-readable form say something else than the symbol.
	if again := split(read.String()); len(again) != len(elements) {
		return nil, "", Fault{Kind: Sign, Got: fmt.Sprintf("a value that reads like an identifier in %q", read.String()), Want: "one that does not"}
	}
	return symbol, read.String(), nil
}

// Parse takes the human-readable form apart and checks it as Encode does. It
// wants exactly what Encode writes: no blanks, nothing before the first
// identifier. Its error is a Fault.
func Parse(hri string) ([]Element, error) {
	elements := split(hri)
	if len(elements) == 0 {
		return nil, Fault{Kind: Foreign, Got: fmt.Sprintf("%q", hri), Want: "an identifier in parentheses first"}
	}
	if err := Check(elements); err != nil {
		return nil, err
	}
	return elements, nil
}

// split cuts at every two to four digits in parentheses; nil when the text does
// not begin with them.
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

// leading is the identifier in parentheses with which s begins.
func leading(s string) string {
	if s == "" || s[0] != '(' {
		return ""
	}
	end := 1
	for end < len(s) && end <= 4 && numeric.holds(rune(s[end])) {
		end++
	}
	if end < 3 || end == len(s) || s[end] != ')' {
		return ""
	}
	return s[1:end]
}

// Check is the first thing that is wrong with the elements, as a Fault; nil if
// nothing is.
func Check(elements []Element) error {
	if faults := Faults(elements); len(faults) > 0 {
		return faults[0]
	}
	return nil
}

// Faults is everything that is wrong with the elements: identifiers known and
// each once, values of the right length and signs, with the right check digit
// and days that exist, and each identifier beside those that it needs and none
// that it excludes.
func Faults(elements []Element) []Fault {
	if len(elements) == 0 {
		return []Fault{{Kind: Empty, Got: "no element", Want: "one or more"}}
	}
	var out []Fault
	for i, e := range elements {
		for _, f := range e.faults(elements[:i], elements) {
			f.element = i
			out = append(out, f)
		}
	}
	return out
}

// faults is what is wrong with e after the elements before it, among all.
func (e Element) faults(before, all []Element) []Fault {
	for _, b := range before {
		if b.AI == e.AI {
			return []Fault{{Kind: Repeated, AI: e.AI, Got: "it twice", Want: "it once", offset: -1}}
		}
	}
	rule := find(e.AI)
	if rule == nil {
		return []Fault{{Kind: Unknown, AI: e.AI, Got: fmt.Sprintf("the identifier %q", e.AI), Want: "one of the GS1 dictionary, such as 01, 10, 17, 21 or 91 to 99", offset: -1}}
	}
	out := rule.faults(e)
	for _, need := range rule.requires {
		if !met(all, need) {
			out = append(out, Fault{Kind: Pairing, AI: e.AI, Got: "it alone", Want: "beside it " + inWords(need), offset: -1})
		}
	}
	for _, pattern := range rule.excludes {
		for _, other := range all {
			if other.AI != e.AI && matches(other.AI, pattern) {
				out = append(out, Fault{Kind: Pairing, AI: e.AI, Got: "(" + other.AI + ") beside it", Want: "one of the two", offset: -1})
			}
		}
	}
	return out
}

// inWords is a requirement for reading: "(01), or (02)", "(01) and (21)".
func inWords(need string) string {
	return "(" + strings.NewReplacer("+", ") and (", ",", "), or (").Replace(need) + ")"
}

// faults is what is wrong with the value of e by itself.
func (r *entry) faults(e Element) []Fault {
	shortest, longest := r.span()
	signs := []rune(e.Value)
	if n := len(signs); n < shortest || n > longest {
		return []Fault{r.lengthFault(e, n, shortest, longest)}
	}
	at := 0
	for _, p := range r.parts {
		if p.optional && at == len(signs) {
			break
		}
		end := min(at+p.longest, len(signs))
		if end-at < p.shortest {
			return []Fault{r.lengthFault(e, len(signs), shortest, longest)}
		}
		if f := p.fault(signs[at:end]); f != nil {
			f.AI, f.offset = e.AI, f.offset+at
			return []Fault{*f}
		}
		at = end
	}
	return nil
}

func (r *entry) lengthFault(e Element, got, shortest, longest int) Fault {
	want := fmt.Sprintf("%d to %d", shortest, longest)
	if shortest == longest {
		want = fmt.Sprint(shortest)
	}
	return Fault{Kind: Length, AI: e.AI, Got: fmt.Sprintf("%q of %d signs", e.Value, got), Want: want, offset: min(got, longest)}
}

// fault is what is wrong with a piece of a value; its offset counts from the
// piece.
func (p component) fault(signs []rune) *Fault {
	for i, c := range signs {
		if !p.set.holds(c) {
			return &Fault{Kind: Sign, Got: fmt.Sprintf("%q", c), Want: p.set.String(), offset: i}
		}
	}
	for _, name := range p.checks {
		if f := judge(name, string(signs)); f != nil {
			return f
		}
	}
	return nil
}
