package gs1

import (
	"fmt"
	"strings"
	"unicode"
)

// A Scanned is a code as a scanner sent it or a person typed it.
type Scanned struct {
	// Symbol is the symbology identifier in front, "]d2"; "" for none.
	Symbol   string
	Elements []Found
	// Separators counts those between the elements.
	Separators int
	// Bracketed says that identifiers stood in parentheses.
	Bracketed bool
	cut       bool // the text was not read to its end
}

// A Found is an element and its place in the text, in signs counted from 1: of
// its identifier, and of the first sign of its value.
type Found struct {
	Element
	At, ValueAt int
}

// List is the elements without their places.
func (s Scanned) List() []Element {
	out := make([]Element, len(s.Elements))
	for i, f := range s.Elements {
		out[i] = f.Element
	}
	return out
}

// longestScan bounds what is read, in bytes. A Data Matrix holds 3,116 digits
// at most.
const longestScan = 8000

// Scan reads what a scanner sends: a symbology identifier in front, if any, of
// a GS1 symbol (]C1 ]d2 ]e0 ]J1 ]Q3), then element strings one after the other,
// or in the human-readable form with identifiers in parentheses. The separator
// may be the sign GS (29), shown as <GS> {GS} [GS] <FNC1> {FNC1} [FNC1] ^] or
// the picture of that sign. Blanks and line ends around the code, and blanks
// around values in the human-readable form, are passed over. A leading
// separator, one at the end, and one after a value of predefined length are
// allowed; a value's own signs never are guessed.
//
// All faults that can be found come back, with their places; the elements read
// until then come with them.
func Scan(text string) (Scanned, []Fault) {
	var out Scanned
	if len(text) > longestScan {
		return out, []Fault{{Kind: Foreign, At: longestScan, Got: fmt.Sprintf("%d bytes", len(text)), Want: "a code, which has fewer than 3,117 signs"}}
	}
	signs, fault := out.symbol(signsOf(text))
	if fault != nil {
		return out, []Fault{*fault}
	}
	for len(signs) > 0 && signs[0].separates {
		signs = signs[1:]
	}
	if len(signs) == 0 {
		return out, []Fault{{Kind: Empty, Got: "nothing", Want: "the text of a code"}}
	}
	if signs[0].r == '(' {
		out.Bracketed = true
		fault = out.bracketed(signs)
	} else {
		fault = out.plain(signs)
	}
	out.cut = out.cut || fault != nil
	faults := out.faults()
	if fault != nil {
		faults = append(faults, *fault)
	}
	return out, faults
}

// faults are those of the elements, with their places. Where the code could not
// be read to its end, nothing is said of what an element needs beside it.
func (s Scanned) faults() []Fault {
	var out []Fault
	if len(s.Elements) == 0 {
		return nil
	}
	for _, f := range Faults(s.List()) {
		if f.Kind == Pairing && s.cut {
			continue
		}
		e := s.Elements[f.element]
		f.At = e.At
		if f.offset >= 0 {
			f.At = e.ValueAt + f.offset
		}
		out = append(out, f)
	}
	return out
}

// A sign is one sign of the text, or a separator in any of its spellings.
type sign struct {
	r         rune
	at        int // place in the text, from 1
	separates bool
}

// gs is the sign that stands for a separator in what a scanner sends.
const gs = '\x1d'

// spellings of a separator, in capital letters.
var spellings = []string{string(gs), "<GS>", "{GS}", "[GS]", "<FNC1>", "{FNC1}", "[FNC1]", "^]", "\u241d"}

// signsOf cuts the text into signs, without blanks and line ends around it.
func signsOf(text string) []sign {
	var out []sign
	runes := []rune(text)
	for at := 0; at < len(runes); {
		if n := spelled(runes[at:]); n > 0 {
			out = append(out, sign{gs, at + 1, true})
			at += n
			continue
		}
		out = append(out, sign{runes[at], at + 1, false})
		at++
	}
	for len(out) > 0 && around(out[0]) {
		out = out[1:]
	}
	for len(out) > 0 && around(out[len(out)-1]) {
		out = out[:len(out)-1]
	}
	return out
}

func around(s sign) bool { return !s.separates && unicode.IsSpace(s.r) }

// spelled is how many signs a separator takes at the beginning; 0 when there is
// none.
func spelled(runes []rune) int {
	if !strings.ContainsRune("\x1d\u241d<{[^", runes[0]) {
		return 0
	}
	for _, s := range spellings {
		n := len([]rune(s))
		if n <= len(runes) && strings.EqualFold(string(runes[:n]), s) {
			return n
		}
	}
	return 0
}

// symbol takes off the symbology identifier (ISO/IEC 15424) and refuses one of
// a symbol that does not carry element strings.
func (s *Scanned) symbol(signs []sign) ([]sign, *Fault) {
	if len(signs) < 3 || signs[0].r != ']' || !unicode.IsLetter(signs[1].r) {
		return signs, nil
	}
	s.Symbol = string([]rune{signs[0].r, signs[1].r, signs[2].r})
	switch s.Symbol {
	case "]C1", "]d2", "]e0", "]J1", "]Q3":
		return signs[3:], nil
	}
	return nil, &Fault{Kind: Foreign, At: signs[0].at, Got: fmt.Sprintf("a symbol of the kind %q", s.Symbol),
		Want: "a GS1 symbol: ]C1, ]d2, ]e0, ]J1 or ]Q3"}
}

// plain reads element strings one after the other.
func (s *Scanned) plain(signs []sign) *Fault {
	for len(signs) > 0 {
		at := signs[0].at
		ai, rule := identifier(signs)
		if rule == nil {
			return s.noIdentifier(signs)
		}
		signs = signs[len(ai):]
		end := 0
		_, longest := rule.span()
		for end < len(signs) && !signs[end].separates && !(rule.predefined && end == longest) {
			end++
		}
		s.add(ai, at, signs[:end])
		signs = signs[end:]
		for len(signs) > 0 && signs[0].separates {
			s.Separators++
			signs = signs[1:]
		}
		if rule.predefined && end < longest && len(signs) > 0 {
			s.cut = true // too short: its own fault tells, and what follows is not sure
			return nil
		}
	}
	return nil
}

func (s *Scanned) add(ai string, at int, value []sign) {
	var text strings.Builder
	for _, v := range value {
		text.WriteRune(v.r)
	}
	s.Elements = append(s.Elements, Found{Element{ai, text.String()}, at, at + len(ai)})
	if len(value) > 0 {
		s.Elements[len(s.Elements)-1].ValueAt = value[0].at
	}
}

// identifier is the one with which the signs begin; no identifier is the
// beginning of another.
func identifier(signs []sign) (string, *entry) {
	ai := ""
	for _, s := range signs[:min(4, len(signs))] {
		if s.separates || !numeric.holds(s.r) {
			break
		}
		ai += string(s.r)
		if rule := find(ai); rule != nil {
			return ai, rule
		}
	}
	return "", nil
}

// noIdentifier is the fault of signs that begin with none.
func (s *Scanned) noIdentifier(signs []sign) *Fault {
	var got strings.Builder
	for _, x := range signs[:min(4, len(signs))] {
		if x.separates {
			break
		}
		got.WriteRune(x.r)
	}
	kind := Unknown
	if len(s.Elements) == 0 && !numeric.holds(signs[0].r) {
		kind = Foreign
	}
	return &Fault{Kind: kind, At: signs[0].at, Got: fmt.Sprintf("%q", got.String()),
		Want: "an identifier of the GS1 dictionary, such as 01, 10, 17, 21 or 91 to 99"}
}

// bracketed reads the human-readable form.
func (s *Scanned) bracketed(signs []sign) *Fault {
	for len(signs) > 0 {
		n := brackets(signs)
		if n == 0 {
			return &Fault{Kind: Foreign, At: signs[0].at, Got: fmt.Sprintf("%q", signs[0].r), Want: "an identifier in parentheses, such as (01) or (91)"}
		}
		ai := ""
		for _, x := range signs[1 : n-1] {
			ai += string(x.r)
		}
		end := n
		for end < len(signs) && brackets(signs[end:]) == 0 {
			end++
		}
		value := signs[n:end]
		for len(value) > 0 && (around(value[0]) || value[0].separates) {
			value = value[1:]
		}
		for len(value) > 0 && (around(value[len(value)-1]) || value[len(value)-1].separates) {
			value = value[:len(value)-1]
		}
		s.add(ai, signs[0].at+1, value)
		signs = signs[end:]
	}
	return nil
}

// brackets is how many signs an identifier in parentheses takes at the
// beginning; 0 when there is none.
func brackets(signs []sign) int {
	if signs[0].separates || signs[0].r != '(' {
		return 0
	}
	n := 1
	for n < len(signs) && n <= 4 && !signs[n].separates && numeric.holds(signs[n].r) {
		n++
	}
	if n < 3 || n == len(signs) || signs[n].r != ')' {
		return 0
	}
	return n + 1
}
