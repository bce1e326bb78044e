package lint

import (
	"regexp"
	"strings"
)

// A House is one house style of numbers and units, as package quantity prints
// it. The zero value is no style.
//
// Where the sources contradict each other a house settles it:
//
//	                uk                      us                  si
//	microgram       in full                 mcg or in full      in full, never the Greek letter
//	thousands       comma; a blank passes   comma               a blank that does not break
//	decimal sign    point                   point               point
//	unit            units, also for         the same            the same
//	                international units
//	millilitre      mL                      mL                  mL; ml is told, not stopped
//	per cent        in brackets after mg/mL the same            the same
//	ratio           never for one drug; for a local anaesthetic with adrenaline
//	                in brackets after micrograms/mL
//	date            01 Dec 2026             2026-12-01          2026-12-01
//
// The lists for the United States ask for mcg, those for the United Kingdom and
// of the WHO for the word; the word in full is on no list of errors, so it
// passes everywhere. ISO writes a comma as decimal sign and allows the Greek
// letter: both are left out, as no site can ask for them.
type House struct{ name string }

// UK is house style "uk".
func UK() House { return House{"uk"} }

// US is house style "us".
func US() House { return House{"us"} }

// SI is house style "si".
func SI() House { return House{"si"} }

// Houses lists all of them.
func Houses() []House { return []House{UK(), US(), SI()} }

// Named finds a house style by its name: uk, us, si.
func Named(name string) (House, bool) {
	for _, h := range Houses() {
		if h.name == name {
			return h, true
		}
	}
	return House{}, false
}

// String is the style's name, "" for the zero value.
func (h House) String() string { return h.name }

// microgram is the word as the house writes it beside a number.
func (h House) microgram(number string) string {
	if h.name == "us" {
		return "mcg"
	}
	return plural("microgram", number)
}

// plural is the unit's word beside a number: more than one takes an s.
func plural(word, number string) string {
	if one(number) {
		return word
	}
	return word + "s"
}

// one reports a number up to one: "1", "0.5".
func one(number string) bool {
	head, tail, _ := strings.Cut(number, ".")
	return head == "0" || head == "" || head == "1" && strings.Trim(tail, "0") == ""
}

// signs are the numbers of a text that a comma or a no-break blank groups, and
// those of four digits or more in front of a unit that nothing groups.
var signs = regexp.MustCompile(`(^|[^\d.,])(\d{1,3}(?:(?:,\d{3})+|(?:[\x{00A0}\x{202F}]\d{3})+)|\d{4,}(?:(?:\.\d+)?` + gap + doseUnit + `\b))`)

// Grouped is a text of words with the thousands of its numbers grouped as the
// house does it (rule N09); nothing else is changed.
func (h House) Grouped(text string) string {
	return signs.ReplaceAllStringFunc(text, func(found string) string {
		g := signs.FindStringSubmatch(found)
		n := strings.IndexFunc(g[2], func(r rune) bool { return r != ',' && r != '\u00a0' && r != '\u202f' && (r < '0' || r > '9') })
		if n < 0 {
			n = len(g[2])
		}
		head := strings.TrimRight(g[2][:n], "\u00a0\u202f")
		return g[1] + h.group(digits(head)) + g[2][len(head):]
	})
}

// group puts the house's sign between the thousands of a run of digits.
func (h House) group(digits string) string {
	sign := ","
	if h.name == "si" {
		sign = "\u00a0"
	}
	var b strings.Builder
	for i, d := range digits {
		if i > 0 && (len(digits)-i)%3 == 0 {
			b.WriteString(sign)
		}
		b.WriteRune(d)
	}
	return b.String()
}
