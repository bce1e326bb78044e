package lint

import "strings"

// Glue puts a no-break blank between each number and its unit in a text of
// words, so that no line ends between them (rule N26).
func Glue(text string) string {
	words := strings.Split(text, " ")
	var b strings.Builder
	for i, w := range words {
		switch {
		case i == 0:
		case Tied(words[i-1], w):
			b.WriteString("\u00a0")
		default:
			b.WriteString(" ")
		}
		b.WriteString(w)
	}
	return b.String()
}

// Tied reports that a word that follows another is the unit of its number.
func Tied(before, word string) bool {
	n := len(before)
	return n > 0 && before[n-1] >= '0' && before[n-1] <= '9' && startsUnit(word)
}

// startsUnit reports a word that is a unit or begins with one: "mg/mL,".
func startsUnit(w string) bool {
	w = strings.TrimRight(w, ".,;:)?")
	head, _, _ := strings.Cut(w, "/")
	switch strings.TrimSuffix(head, "s") {
	case "mL", "L", "g", "mg", "kg", "microgram", "mcg", "nanogram", "unit", "milliunit", "mmol", "micromol",
		"cm", "m²", "h", "min", "%", "day", "hour", "minute", "year", "month", "week":
		return true
	}
	return false
}
