package quantity

import "strings"

// A piece is one number with its unit in a text of several: "5 feet 7 inches".
type piece struct{ number, unit string }

// pieces cuts a text into numbers, each with the words behind it. It is empty
// when the text does not begin with a number.
func pieces(text string) []piece {
	var out []piece
	for rest := text; rest != ""; {
		number, tail := splitNumber(rest)
		if number == "" {
			return nil
		}
		end := strings.IndexAny(tail, "0123456789")
		if end < 0 {
			end = len(tail)
		}
		unit := strings.TrimRight(tail[:end], " ,")
		out = append(out, piece{number, strings.TrimSuffix(unit, " and")})
		rest = tail[end:]
	}
	return out
}

// A measure is one unit that is read in words, for instance the pound. Two
// measures of one scale may stand together, the larger first.
type measure struct {
	one, more string   // written out: "pound", "pounds"
	also      []string // other spellings that are read
	short     []string // abbreviations that are refused, and named
	size      exact    // in the base unit
	whole     bool     // a part of it is written in the next smaller one
}

// read reports that the unit is read as this measure.
func (m measure) read(unit string) bool {
	return unit == m.one || unit == m.more || listed(m.also, unit)
}

func listed(list []string, s string) bool {
	for _, x := range list {
		if x == s {
			return true
		}
	}
	return false
}

// A ladder is the measures of one scale, large to small.
type ladder []measure

// find is the place of a unit on the ladder, and whether it is written out.
func (l ladder) find(unit string) (at int, written, ok bool) {
	for i, m := range l {
		if m.read(unit) {
			return i, true, true
		}
		if listed(m.short, unit) || listed(m.short, strings.ToLower(strings.TrimSuffix(unit, "."))) {
			return i, false, true
		}
	}
	return 0, false, false
}

// owns reports that the text begins with a unit of the ladder.
func (l ladder) owns(text string) bool {
	p := pieces(text)
	if len(p) == 0 {
		return false
	}
	_, _, ok := l.find(p[0].unit)
	return ok
}

// total reads a text of the ladder: "165 pounds", "11 stone 4 pounds". Zero is
// allowed behind the first piece only. Errors are *SyntaxError; an abbreviation
// is one, and names what was probably meant.
func (l ladder) total(s, want string) (exact, error) {
	text := clean(s)
	r := reading{got: s, text: text, want: want}
	list, sum, last := pieces(text), whole(0), -1
	for i, p := range list {
		at, written, ok := l.find(p.unit)
		switch {
		case !ok && p.unit == "":
			return sum, r.fault(UnknownUnit, "the unit behind "+p.number+" is missing", l.spelled(list))
		case !ok:
			return sum, r.fault(UnknownUnit, `the unit "`+p.unit+`" is not known here`, "")
		case !written:
			return sum, r.fault(WrongUnit, `"`+p.unit+`" can be misread and must be written out`, l.spelled(list))
		case at <= last:
			return sum, r.fault(BadNumber, "the larger unit stands first, and each stands once", "")
		}
		x, code, why := readNumber(p.number)
		if why != "" {
			return sum, r.fault(code, why, l.spelled(list))
		}
		if why := l.misfit(list, i, at, x); why != "" {
			return sum, r.fault(BadNumber, why, "")
		}
		if i == 0 && !x.positive() {
			return sum, r.fault(ZeroOrLess, "it must be more than zero", "")
		}
		sum, last = sum.add(x.mul(l[at].size)), at
	}
	return sum, nil
}

// misfit says why a number does not fit its place: a broken number of feet, or
// 14 inches behind the feet.
func (l ladder) misfit(list []piece, i, at int, x exact) string {
	if !x.r.IsInt() && (l[at].whole || i+1 < len(list)) {
		next := "the smaller unit"
		if at+1 < len(l) {
			next = l[at+1].more
		}
		return "a part of a " + l[at].one + " is written in " + next
	}
	if i > 0 {
		before, _, _ := l.find(list[i-1].unit)
		if x.mul(l[at].size).cmp(l[before].size) >= 0 {
			return list[i].number + " " + l[at].more + " make a " + l[before].one + " or more"
		}
	}
	return ""
}

// spelled is the text with every number mended and every unit written out; ""
// where that is open. A unit that is missing at the end is the next smaller one.
func (l ladder) spelled(list []piece) string {
	var out []string
	last := -1
	for i, p := range list {
		at, _, ok := l.find(p.unit)
		if !ok {
			if p.unit != "" || i == 0 || last+1 >= len(l) {
				return ""
			}
			at = last + 1
		}
		number := likelyNumber(p.number)
		if plainNumber(p.number) {
			number = trimZeros(p.number)
		}
		if number == "" {
			return ""
		}
		word := l[at].more
		if number == "1" {
			word = l[at].one
		}
		out, last = append(out, number+" "+word), at
	}
	return strings.Join(out, " ")
}
