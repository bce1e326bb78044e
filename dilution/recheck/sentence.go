package recheck

import (
	"strings"
	"time"
	"unicode"
)

// This file cuts a sentence into the figures that it holds.

// A tokenKind says what a figure in a sentence is.
type tokenKind int

const (
	withUnit tokenKind = iota + 1
	withoutUnit
	dateOrTime
	wordWithDigits
)

// A token is one figure of a sentence. Text is what is shown of it, word the
// number or word as it stands, before the word in front of it. Odd tells that
// the number is in neither the printed nor the typed style. Fault says why
// nothing could confirm it.
type token struct {
	kind   tokenKind
	text   string
	word   string
	before string
	odd    bool
	number value
	unit   value
	day    string // "2026-12-01"
	clock  string // "07:30"
	fault  string
}

// reading is a quantity, taken apart as a figure is.
func (t token) reading() reading {
	return reading{number: t.number, unit: t.unit, whole: t.number.times(t.unit)}
}

// A piece is a word of a sentence without the marks around it; closed says
// whether a mark parts it from the next.
type piece struct {
	core   string
	closed bool
}

// fold makes every run of blanks one space; those that group a number stay.
func fold(text string) string {
	return strings.Join(strings.FieldsFunc(unbroken(text), func(r rune) bool {
		return unicode.IsSpace(r) && r != '\u202f' && r != '\u00a0'
	}), " ")
}

// unbroken turns the no-break blanks that do not group a number into spaces.
func unbroken(text string) string {
	if !strings.ContainsAny(text, "\u202f\u00a0") {
		return text
	}
	runes := []rune(text)
	digit := func(i int) bool { return i >= 0 && i < len(runes) && runes[i] >= '0' && runes[i] <= '9' }
	for i, r := range runes {
		if r != '\u202f' && r != '\u00a0' {
			continue
		}
		if !digit(i-1) || !digit(i+1) || !digit(i+2) || !digit(i+3) || digit(i+4) {
			runes[i] = ' '
		}
	}
	return string(runes)
}

const (
	openingMarks = "([{\"'“‘±<>≤≥=~"
	closingMarks = ".,;:!?)]}\"'”’"
)

func pieces(text string) []piece {
	var out []piece
	for _, word := range strings.Split(fold(text), " ") {
		word = strings.TrimLeft(word, openingMarks)
		core := strings.TrimRight(word, closingMarks)
		out = append(out, piece{core: core, closed: core != word})
	}
	return out
}

// tokens lists the figures of a sentence from left to right.
func tokens(text string) []token {
	words := pieces(text)
	var out []token
	for i := 0; i < len(words); {
		found, used := tokensAt(words, i)
		for n := range found {
			if i > 0 {
				found[n].before = words[i-1].core
			}
		}
		out = append(out, found...)
		i += used
	}
	return out
}

// tokensAt reads what begins at word i, and says how many words it took.
func tokensAt(words []piece, i int) ([]token, int) {
	core := words[i].core
	if !strings.ContainsFunc(core, unicode.IsNumber) {
		return nil, 1
	}
	if t, used := momentAt(words, i); used > 0 {
		return []token{t}, used
	}
	if _, ok := sentenceUnit(core); ok || i > 0 && isStandard(words[i-1].core+" "+core) || isOwnRule(core) {
		return nil, 1
	}
	if n, odd, ok := sentenceNumber(core); ok {
		t, used := numberAt(words, i, token{kind: withoutUnit, word: core, text: core, number: n, odd: odd})
		return []token{t}, used
	}
	if both, used := rangeAt(words, i); used > 0 {
		return both, used
	}
	return []token{{kind: wordWithDigits, word: core, text: core}}, 1
}

// sentenceNumber reads a number as printed or as typed. What reads as a number
// but is in neither style (a zero too many in front or behind) is odd.
func sentenceNumber(core string) (n value, odd, ok bool) {
	if n, err := printedNumber(core); err == nil {
		return n, false, true
	}
	n, err := typedNumber(core)
	if err != nil {
		return value{}, false, false
	}
	front, back, _ := strings.Cut(core, ".")
	return n, len(front) > 1 && front[0] == '0' || strings.HasSuffix(back, "0"), true
}

// numberAt finds the unit of a number: behind it, or behind the last number of
// "0.15 to 0.3 mg/kg". Hours and the minutes behind them are one span.
func numberAt(words []piece, i int, t token) (token, int) {
	unit, used := unitAt(words, i)
	if used == 0 {
		return bareAt(words, i, t), 1
	}
	t.kind, t.unit = withUnit, unit
	if used == 1 {
		t.text += " (as the number behind it)"
		return t, 1
	}
	t.text += " " + words[i+1].core
	if words[i+1].core != "h" || words[i+1].closed || i+3 >= len(words) || words[i+2].closed || words[i+3].core != "min" {
		return t, 2
	}
	minutes, odd, ok := sentenceNumber(words[i+2].core)
	if !ok || odd || minutes.against(whole(60)) >= 0 {
		return t, 2
	}
	t.text += " " + words[i+2].core + " min"
	t.word += " " + words[i+2].core
	t.number = t.number.times(whole(60)).plus(minutes)
	t.unit = whole(1).ofKind(one(inTime))
	return t, 4
}

// unitAt is the unit of the number at word i. It takes two words where it
// stands behind the number, one where it is shared with a later number, none
// where there is none.
func unitAt(words []piece, i int) (value, int) {
	if words[i].closed || i+1 >= len(words) {
		return value{}, 0
	}
	if unit, ok := sentenceUnit(words[i+1].core); ok {
		return unit, 2
	}
	for i+3 < len(words) && !words[i].closed && !words[i+1].closed && isJoint(words[i+1].core) {
		i += 2
		if _, _, ok := sentenceNumber(words[i].core); !ok || words[i].closed {
			return value{}, 0
		}
		if unit, ok := sentenceUnit(words[i+1].core); ok {
			return unit, 1
		}
	}
	return value{}, 0
}

func isJoint(word string) bool {
	switch word {
	case "to", "and", "or", "–", "-":
		return true
	}
	return false
}

// bareAt looks at what stands behind a number without a unit: a word that looks
// like a unit which the table does not know, or a unit parted from its number.
func bareAt(words []piece, i int, t token) token {
	if i+1 >= len(words) {
		return t
	}
	next := words[i+1].core
	_, known := sentenceUnit(next)
	if words[i].closed && known {
		t.fault = "a mark parts " + t.text + " from " + next
	}
	if !words[i].closed && looksLikeUnit(next) {
		t.fault = t.text + " " + next + " has a unit that the second route does not know"
	}
	return t
}

// looksLikeUnit is true of words with a stroke, of words of one or two letters
// that are no plain words, and of words with a capital behind a small letter.
func looksLikeUnit(word string) bool {
	switch word {
	case "", "a", "an", "as", "at", "be", "by", "do", "he", "if", "in", "is", "it", "no", "of", "on", "or", "so", "to", "up", "we", "IV", "IM", "SC", "–", "-", "x", "×":
		return false
	}
	if strings.ContainsFunc(word, unicode.IsNumber) {
		return false
	}
	if strings.Contains(word, "/") || len([]rune(word)) <= 2 {
		return true
	}
	small := false
	for _, r := range word {
		if small && unicode.IsUpper(r) {
			return true
		}
		small = unicode.IsLower(r)
	}
	return false
}

// rangeAt reads "0.15–0.3" or "90-110": two numbers that share what follows.
func rangeAt(words []piece, i int) ([]token, int) {
	front, back, found := strings.Cut(words[i].core, "–")
	if !found {
		front, back, found = strings.Cut(words[i].core, "-")
	}
	low, odd, ok := sentenceNumber(front)
	high, strange, fine := sentenceNumber(back)
	if !found || !ok || !fine {
		return nil, 0
	}
	last, used := numberAt(words, i, token{kind: withoutUnit, word: back, text: back, number: high, odd: strange})
	if used > 2 {
		return nil, 0
	}
	first := last
	first.word, first.number, first.odd = front, low, odd
	first.text = front + strings.TrimPrefix(last.text, back)
	return []token{first, last}, used
}

// sentenceUnit adds to the typed units the words that only sentences use.
func sentenceUnit(word string) (value, bool) {
	switch word {
	case "year", "years":
		return whole(12).ofKind(one(inMonths)), true
	case "month", "months":
		return whole(1).ofKind(one(inMonths)), true
	case "week", "weeks":
		return whole(10_080).ofKind(one(inTime)), true
	case "minute", "minutes":
		return whole(1).ofKind(one(inTime)), true
	case "mm":
		return pair(1, 10).ofKind(one(inLength)), true
	}
	unit, err := compound(word, typedUnit)
	return unit, err == nil
}

// momentAt reads a date, a time of day, or both, in one of the two styles of
// paper.
func momentAt(words []piece, i int) (token, int) {
	t := token{kind: dateOrTime, text: words[i].core, word: words[i].core}
	if written(words[i].core, "15:04") {
		t.clock = words[i].core
		return t, 1
	}
	used := 0
	if written(t.text, "2006-01-02") {
		t.day, used = t.text, 1
	} else if i+2 < len(words) && !words[i].closed && !words[i+1].closed {
		long := t.text + " " + words[i+1].core + " " + words[i+2].core
		if day, err := time.Parse("02 Jan 2006", long); err == nil && day.Format("02 Jan 2006") == long {
			t.text, t.day, used = long, day.Format("2006-01-02"), 3
		}
	}
	if used == 0 {
		return token{}, 0
	}
	if next := i + used; next < len(words) && !words[next-1].closed && written(words[next].core, "15:04") {
		t.clock = words[next].core
		t.text += " " + t.clock
		used++
	}
	return t, used
}

// written says whether text is a time in this layout, letter for letter.
func written(text, layout string) bool {
	t, err := time.Parse(layout, text)
	return err == nil && t.Format(layout) == text
}
