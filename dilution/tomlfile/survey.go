package tomlfile

import (
	"bytes"
	"fmt"
	"strings"

	"github.com/pelletier/go-toml/v2/unstable"

	"drawup/dilution/refusal"
)

const (
	maxFaults = 50 // reasons of one kind; a file with more is not TOML at all
	maxDepth  = 8  // deeper lists and inline tables keep their parent's place
)

// A sort says what a path holds.
type sort int

const (
	holdsValue    sort = iota + 1
	holdsTable         // [a] or a.b = …
	holdsImplicit      // a, of [a.b]
	holdsArray         // [[a]]
)

// expression is one key with its value, or one table header.
type expression struct {
	from, to int
	key      string // dotted, as the user wrote it, with its tables
	short    string // the last name of key
	header   bool
	value    unstable.Kind
	raw      string // the value's text, where it is one word
}

// spelling is a key as it is written, and where.
type spelling struct {
	at   int
	name string
	key  string // with its table
}

// survey is one pass over the syntax of a file: where everything is, what is
// there twice, and the first place that does not read.
type survey struct {
	lines  *lines
	text   []byte // a copy in which faulty parts are blanked
	places *Places
	sorts  map[string]sort
	count  map[string]int
	// parents is the table of the key that begins at an offset.
	parents map[int]string
	// spelled is every key as it is written, to hold its letter case against
	// the known ones.
	spelled []spelling
	list    refusal.List
	exprs   []expression

	parser   unstable.Parser
	table    string // path of the current table
	dotted   string // the same in the user's words
	dropping bool   // the current table is there twice; its keys are set aside
}

// newSurvey walks text until its end or its first fault of syntax, whose place
// and message it returns; message is "" when all of it reads.
func newSurvey(name string, text []byte) (s *survey, at int, message string) {
	s = &survey{
		lines: newLines(name, text), text: bytes.Clone(text),
		places: &Places{name: name, at: map[string]refusal.Pos{}, whole: true},
		sorts:  map[string]sort{}, count: map[string]int{}, parents: map[int]string{},
	}
	// The parser tells places by capacity, so that the slice must end where
	// its array ends.
	data := text[:len(text):len(text)]
	s.parser.Reset(data)
	for s.parser.NextExpression() {
		s.expression(s.parser.Expression())
	}
	err := s.parser.Error()
	if err == nil {
		return s, 0, ""
	}
	at = len(text)
	if p, ok := err.(*unstable.ParserError); ok {
		if off := cap(data) - cap(p.Highlight); p.Highlight != nil && off >= 0 && off <= len(text) {
			at = off
		}
	}
	return s, at, err.Error()
}

func (s *survey) expression(n *unstable.Node) {
	switch n.Kind {
	case unstable.Table, unstable.ArrayTable:
		s.header(n)
	case unstable.KeyValue:
		e := expression{from: int(n.Raw.Offset), to: int(n.Raw.Offset + n.Raw.Length), value: n.Value().Kind}
		e.raw = string(s.parser.Raw(n.Value().Raw))
		names := keyNames(n)
		e.short = names[len(names)-1]
		e.key = strings.TrimPrefix(s.dotted+"."+strings.Join(names, "."), ".")
		s.exprs = append(s.exprs, e)
		if s.dropping || !s.keyValue(s.table, n, 0) {
			s.blank(e.from, e.to)
		}
	}
}

func (s *survey) spell(at int, name string) {
	s.spelled = append(s.spelled, spelling{at: at, name: name, key: s.field(name, "")})
}

func keyNames(n *unstable.Node) []string {
	var names []string
	for it := n.Key(); it.Next(); {
		names = append(names, string(it.Node().Data))
	}
	return names
}

// header enters a table. A table that is there twice is set aside with all its
// keys.
func (s *survey) header(n *unstable.Node) {
	names := keyNames(n)
	it := n.Key()
	it.Next()
	start := int(it.Node().Raw.Offset)
	e := expression{from: s.lines.starts[s.lines.line(start)], header: true,
		key: strings.Join(names, "."), short: names[len(names)-1]}
	_, e.to = s.lines.span(s.lines.line(start))
	s.exprs = append(s.exprs, e)
	path, ok := "", true
	for _, name := range names[:len(names)-1] {
		path, ok = s.descend(path, name, start, holdsImplicit)
		if !ok {
			break
		}
	}
	if ok {
		path, ok = s.open(path, e.short, start, n.Kind == unstable.ArrayTable)
	}
	s.table, s.dotted, s.dropping = path, e.key, !ok
	s.spelled = append(s.spelled, spelling{at: start, name: e.short, key: e.key})
	if !ok {
		s.places.whole = false
		s.repeated(start, e.key, "the table")
		s.blank(e.from, e.to)
	}
}

// descend goes one table down on the way to a key or another table.
func (s *survey) descend(path, name string, start int, as sort) (string, bool) {
	path += named(name)
	switch s.sorts[path] {
	case holdsValue:
		return path, false
	case holdsArray:
		return path + numbered(s.count[path]-1), true
	case holdsTable, holdsImplicit:
		return path, true
	}
	s.sorts[path] = as
	s.places.set(path, s.lines.at(start))
	return path, true
}

// open starts the table that a header names.
func (s *survey) open(path, name string, start int, array bool) (string, bool) {
	s.parents[start] = path
	path += named(name)
	was := s.sorts[path]
	switch {
	case array && (was == 0 || was == holdsArray):
		s.sorts[path] = holdsArray
		s.places.set(path, s.lines.at(start))
		n := s.count[path]
		s.count[path]++
		path += numbered(n)
	case !array && (was == 0 || was == holdsImplicit):
		s.sorts[path] = holdsTable
	default:
		return path, false
	}
	s.places.set(path, s.lines.at(start))
	return path, true
}

// keyValue notes a key and what its value holds; false when it, or a key of an
// inline table inside it, is there twice.
func (s *survey) keyValue(path string, n *unstable.Node, depth int) bool {
	names := keyNames(n)
	it := n.Key()
	it.Next()
	start, ok := int(it.Node().Raw.Offset), true
	for _, name := range names[:len(names)-1] {
		if path, ok = s.descend(path, name, start, holdsTable); !ok {
			s.repeated(start, name, "the key")
			return false
		}
	}
	s.spell(start, names[len(names)-1])
	s.parents[start] = path
	path += named(names[len(names)-1])
	if s.sorts[path] != 0 {
		s.repeated(start, names[len(names)-1], "the key")
		return false
	}
	s.sorts[path] = holdsValue
	return s.value(path, n.Value(), start, depth)
}

// value notes the place of a value and of what is inside it.
func (s *survey) value(path string, n *unstable.Node, start, depth int) bool {
	if n.Raw.Length > 0 {
		start = int(n.Raw.Offset)
	}
	s.places.set(path, s.lines.at(start))
	if depth >= maxDepth {
		return true
	}
	ok := true
	switch n.Kind {
	case unstable.InlineTable:
		for it := n.Children(); it.Next(); {
			if it.Node().Kind == unstable.KeyValue {
				ok = s.keyValue(path, it.Node(), depth+1) && ok
			}
		}
	case unstable.Array:
		count := 0
		for it := n.Children(); it.Next(); {
			if it.Node().Kind != unstable.Comment {
				ok = s.value(path+numbered(count), it.Node(), start, depth+1) && ok
				count++
			}
		}
	}
	return ok
}

func (s *survey) repeated(at int, key, what string) {
	if len(s.list) >= maxFaults {
		return
	}
	s.list = append(s.list, refusal.Reason{
		Code: refusal.KeyRepeated, Severity: refusal.Refuse, Field: s.field(key, what),
		Message: fmt.Sprintf("%s %q stands in the same place twice, and it is not clear which one counts", what, key),
		Got:     "twice", Want: "once", Remedy: "take one of them out", Pos: s.lines.at(at),
	})
}

// field is a key with its table, in the user's words.
func (s *survey) field(key, what string) string {
	if what == "the table" {
		return key
	}
	return strings.TrimPrefix(s.dotted+"."+key, ".")
}

// blank overwrites a part of the text with blanks and leaves its line ends, so
// that every place stays what it was.
func (s *survey) blank(from, to int) { blank(s.text, from, to) }

func blank(text []byte, from, to int) {
	for i := from; i < to && i < len(text); i++ {
		if text[i] != '\n' && text[i] != '\r' {
			text[i] = ' '
		}
	}
}
