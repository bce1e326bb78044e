package tomlfile

import (
	"strconv"
	"strings"
	"unicode/utf8"

	"drawup/dilution/refusal"
)

// Places knows where every key of a file stands. A path is the names of the
// tables and the key; a table of an array, or an element of a list, is followed
// by its number from 0: "patient", 1, "syringe", 0, "dose".
// The zero value, and nil, know no place.
type Places struct {
	name  string
	at    map[string]refusal.Pos
	whole bool
}

// Of is the place of the value at path: line and column count from 1, columns
// in characters. A path that is not in the file gives the place of its nearest
// parent, in the end the file alone.
func (p *Places) Of(path ...any) refusal.Pos {
	if p == nil {
		return refusal.Pos{}
	}
	found, _ := p.resolve(path)
	if pos, ok := p.at[found]; ok {
		return pos
	}
	return refusal.Pos{File: p.name}
}

// Has reports whether the file holds path, even if its value could not be
// read: such a value has a reason of its own and is not missing.
func (p *Places) Has(path ...any) bool {
	if p == nil {
		return false
	}
	_, all := p.resolve(path)
	return all && len(path) > 0
}

// resolve goes down path as far as the file does. A table in single brackets
// is the first and only one of its name, so that number 0 stands for it.
func (p *Places) resolve(path []any) (found string, all bool) {
	for _, part := range path {
		next := found
		switch v := part.(type) {
		case string:
			next += named(v)
		case int:
			next += numbered(v)
		default:
			return found, false
		}
		_, ok := p.at[next]
		if n, number := part.(int); !ok && !(number && n == 0 && found != "") {
			return found, false
		}
		if ok {
			found = next
		}
	}
	return found, true
}

// Whole reports whether every table was read. When it is false, a key that is
// not there may merely stand in the part that was set aside.
func (p *Places) Whole() bool { return p != nil && p.whole }

// A path inside is one text. Names are quoted, so that no two paths share one.
// The decoder does not tell capital letters from small ones in a key, so a path
// must not either: "Weight" after "weight" would silently win.
func named(s string) string { return "/" + strconv.Quote(strings.ToLower(s)) }

func numbered(n int) string { return "#" + strconv.Itoa(n) }

// set notes the place of a path that has none yet.
func (p *Places) set(path string, pos refusal.Pos) {
	if _, ok := p.at[path]; !ok {
		p.at[path] = pos
	}
}

// lines turns a byte offset into line and column.
type lines struct {
	name   string
	text   []byte
	starts []int // offset of each line's first byte
}

func newLines(name string, text []byte) *lines {
	l := &lines{name: name, text: text, starts: []int{0}}
	for i, b := range text {
		if b == '\n' {
			l.starts = append(l.starts, i+1)
		}
	}
	return l
}

// line is the number of the line, from 0, that holds offset.
func (l *lines) line(offset int) int {
	low, high := 0, len(l.starts)
	for high-low > 1 {
		mid := (low + high) / 2
		if l.starts[mid] <= offset {
			low = mid
		} else {
			high = mid
		}
	}
	return low
}

// span is the offsets of line n without its line end.
func (l *lines) span(n int) (from, to int) {
	from, to = l.starts[n], len(l.text)
	if n+1 < len(l.starts) {
		to = l.starts[n+1] - 1
	}
	return from, to
}

func (l *lines) at(offset int) refusal.Pos {
	offset = min(max(offset, 0), len(l.text))
	n := l.line(offset)
	return refusal.Pos{File: l.name, Line: n + 1, Column: utf8.RuneCount(l.text[l.starts[n]:offset]) + 1}
}

// offset is the reverse for a column counted in bytes, as the decoder counts.
func (l *lines) offset(line, column int) int {
	if line < 1 || line > len(l.starts) {
		return len(l.text)
	}
	return min(l.starts[line-1]+max(column, 1)-1, len(l.text))
}
