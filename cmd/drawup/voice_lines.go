package main

import (
	"fmt"
	"io"
	"strings"
	"unicode/utf8"
)

// pad fills s with blanks to n characters, with at least one blank.
func pad(s string, n int) string {
	return s + strings.Repeat(" ", max(1, n-utf8.RuneCountInString(s)))
}

// padLeft puts blanks before s up to n characters.
func padLeft(s string, n int) string {
	return strings.Repeat(" ", max(0, n-utf8.RuneCountInString(s))) + s
}

// line writes one indented line of an answer: a name and a value.
func line(w io.Writer, name, value string) {
	fmt.Fprintf(w, "  %s%s\n", pad(name, 22), value)
}

// listed cuts a list at its commas. A comma between digits is left for the reader
// of the number, which refuses it.
func listed(s string) []string {
	var out []string
	from := 0
	for i, c := range s {
		if c != ',' || i == 0 || strings.ContainsRune("0123456789", rune(s[i-1])) {
			continue
		}
		out, from = append(out, s[from:i]), i+1
	}
	return append(out, s[from:])
}

// plain is the number of a printed quantity without its unit and separators.
func plain(printed string) string {
	number, _, _ := strings.Cut(printed, " ")
	return strings.NewReplacer(",", "", "\u00a0", "", "\u202f", "").Replace(number)
}

// shown is q as a line of working shows it: "about" says that printing rounded
// it. Printed and exact are the same number or they are not; nothing is worked
// again here.
func shown(q *quantityJSON) string {
	if plain(q.Printed) == q.Exact {
		return q.Printed
	}
	return "about " + q.Printed
}
