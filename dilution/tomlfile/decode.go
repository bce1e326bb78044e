package tomlfile

import (
	"bytes"
	"errors"
	"fmt"
	"strings"

	"github.com/pelletier/go-toml/v2"
	"github.com/pelletier/go-toml/v2/unstable"

	"drawup/dilution/refusal"
)

// Decode reads data, the text of the file called name, into the struct that
// into points to. Keys that the struct does not have are refused, so are keys
// that stand twice, values of the wrong type and lines that are not TOML:
// file-syntax, key-unknown, key-repeated, value-wrong-type, time-malformed for a
// bare date or time that does not exist, and those of [ReadFile] for the text itself. Each reason carries line and column. A line or
// key with a fault is set aside and the rest is decoded, so that one run names
// every fault.
//
// known, if given, lists the keys of the struct with their tables and without
// numbers ("patient.syringe.dose"; "*" for any name), and serves to say which
// key was probably meant.
//
// The places are never nil. What into holds after a refusal is good for finding
// more faults, never for making anything.
func Decode(name string, data []byte, into any, known ...string) (*Places, refusal.List) {
	text, list := checkText(name, data)
	if list.Refused() {
		return &Places{name: name}, list
	}
	s, list := surveyed(name, text)
	list = append(list, s.miscased(known)...)
	if s.places.whole {
		list = append(list, s.decode(into, known)...)
	}
	list.Sort()
	return s.places, list
}

// surveyed walks the text and sets aside the lines that do not read.
func surveyed(name string, text []byte) (*survey, refusal.List) {
	var list refusal.List
	text = bytes.Clone(text)
	broken := map[string]refusal.Pos{} // keys of the lines set aside
	for {
		s, at, message := newSurvey(name, text)
		if message == "" {
			for path, pos := range broken {
				s.places.set(path, pos)
			}
			return s, append(list, s.list...)
		}
		from, to := s.lines.span(s.lines.line(at))
		line := string(bytes.TrimRight(text[from:to], "\r"))
		if begins := s.broken(); begins < s.lines.line(at) {
			message += fmt.Sprintf("; it begins on line %d", begins+1)
		}
		reason := syntaxReason(s.lines.at(at), line, message)
		key, mendable := setAside(line)
		if mendable {
			reason.Field = s.field(key, "")
		}
		list = append(list, reason)
		if !mendable || len(list) >= maxFaults {
			s.places.whole = false
			return s, append(list, s.list...)
		}
		if key != "" {
			broken[s.table+named(key)] = s.lines.at(from)
		}
		blank(text, from, to)
	}
}

// broken is the number, from 0, of the line on which the key or header that does
// not read begins: the first line with content after the last that reads.
func (s *survey) broken() int {
	n := 0
	if len(s.exprs) > 0 {
		n = s.lines.line(s.exprs[len(s.exprs)-1].to) + 1
	}
	for ; n < len(s.lines.starts); n++ {
		from, to := s.lines.span(n)
		if line := bytes.TrimSpace(s.lines.text[from:to]); len(line) > 0 && line[0] != '#' {
			break
		}
	}
	return n
}

// setAside says whether a broken line can be left out without changing what
// the lines after it mean, and which key it was to give. A broken header
// cannot: its keys would fall into another table.
func setAside(line string) (key string, mendable bool) {
	t := strings.TrimSpace(line)
	n := strings.IndexAny(t, "=:")
	if n < 0 || strings.HasPrefix(t, "[") {
		return "", false
	}
	return strings.Trim(strings.TrimSpace(t[:n]), `"'`), true
}

// syntaxReason explains a line that is not TOML. The usual slips are a value
// without quotes, a colon for the equals sign and a word processor's quotes.
func syntaxReason(pos refusal.Pos, line, message string) refusal.Reason {
	r := refusal.Reason{
		Code: refusal.FileSyntax, Severity: refusal.Refuse, Pos: pos,
		Message: fmt.Sprintf("line %d cannot be read: %s", pos.Line, strings.TrimPrefix(message, "toml: ")),
		Got:     shortened(strings.TrimSpace(line)), Want: `a line such as: weight = "72 kg"`,
		Remedy: "mend this line",
	}
	t := strings.TrimSpace(line)
	if t == "" {
		r.Got = "an empty line, or the end of the file"
	}
	n := strings.IndexAny(t, "=:")
	if n <= 0 || strings.HasPrefix(t, "[") {
		return r
	}
	key, value := strings.TrimSpace(t[:n]), strings.TrimSpace(t[n+1:])
	if cut := strings.IndexByte(value, '#'); cut >= 0 {
		value = strings.TrimSpace(value[:cut])
	}
	plain := strings.Trim(value, "\"'“”„«»‘’")
	if plain == "" || strings.ContainsAny(plain, "\"'\\[]{}=“”„«»") || !bareKey(key) {
		return r
	}
	r.Remedy = fmt.Sprintf(`write: %s = "%s"`, key, plain)
	why := "the value of %q is not in plain straight quotes"
	switch {
	case t[n] == ':':
		why = "%q is followed by a colon, not by an equals sign"
	case plain == value:
		why = "the value of %q is not in quotes"
	case value[0] == '"' || value[0] == '\'':
		return r // straight quotes, and something else is wrong
	}
	r.Message = fmt.Sprintf("line %d cannot be read: "+why, pos.Line, key)
	return r
}

func bareKey(s string) bool {
	for _, r := range s {
		if !(r == '_' || r == '-' || '0' <= r && r <= '9' || 'a' <= r && r <= 'z' || 'A' <= r && r <= 'Z') {
			return false
		}
	}
	return s != ""
}

// shortened keeps a quotation of the file short.
func shortened(s string) string {
	const most = 60
	if r := []rune(s); len(r) > most {
		return string(r[:most]) + "…"
	}
	return s
}

// decode fills into. The decoder stops at the first value of a wrong type; that
// value is blanked and the decoding begins again, until nothing is wrong.
func (s *survey) decode(into any, known []string) refusal.List {
	var list refusal.List
	for len(list) < maxFaults {
		d := toml.NewDecoder(bytes.NewReader(s.text))
		err := d.DisallowUnknownFields().Decode(into)
		if err == nil {
			return list
		}
		var missing *toml.StrictMissingError
		var wrong *toml.DecodeError
		switch {
		case errors.As(err, &missing):
			return append(list, s.unknown(missing, known)...)
		case errors.As(err, &wrong):
			e, ok := s.expressionAt(s.lines.offset(wrong.Position()))
			if ok && !e.header {
				list = append(list, s.wrongValue(e, wrong))
				s.blank(e.from, e.to)
				continue
			}
			s.places.whole = false
			return append(list, s.wrongTable(e, wrong))
		default:
			s.places.whole = false
			return append(list, one(s.lines.name, refusal.FileSyntax,
				fmt.Sprintf("the file %q contradicts itself: %s", s.lines.name, strings.TrimPrefix(err.Error(), "toml: ")),
				strings.TrimPrefix(err.Error(), "toml: "), "each key and table once, in one form", "mend the key that is named")...)
		}
	}
	return list
}

// expressionAt is the last key or header that begins at or before offset.
func (s *survey) expressionAt(offset int) (expression, bool) {
	var found expression
	ok := false
	for _, e := range s.exprs {
		if e.from <= offset {
			found, ok = e, true
		}
	}
	return found, ok
}

// wrongValue explains a value that cannot be taken. The decoder names the target
// of a value of the wrong type; of a bare date or time that is none it only says
// that it does not read.
func (s *survey) wrongValue(e expression, err *toml.DecodeError) refusal.Reason {
	if !bareMoment(e.value) || strings.Contains(err.Error(), " into ") {
		return s.wrongType(e, err)
	}
	got := shortened(e.raw)
	if got == "" {
		got = "a bare date or time"
	}
	r := refusal.Reason{
		Code: refusal.TimeMalformed, Severity: refusal.Refuse, Field: e.key, Rule: "R18", Pos: s.lines.at(s.lines.offset(err.Position())),
		Got: got, Want: "a day of the calendar such as 2026-12-01, or a time of day such as 07:30:00",
		Message: fmt.Sprintf("the value of %q is a date or time that does not exist", e.short),
		Remedy:  "write a date that exists, as year-month-day, or a time that exists",
	}
	if e.value == unstable.LocalDate {
		r.Want, r.Remedy = "a day of the calendar such as 2026-12-01", "write a date that exists, as year-month-day"
		r.Message = fmt.Sprintf("the value of %q is a date that does not exist", e.short)
	}
	return r
}

func bareMoment(k unstable.Kind) bool {
	switch k {
	case unstable.LocalDate, unstable.LocalTime, unstable.LocalDateTime, unstable.DateTime:
		return true
	}
	return false
}

func (s *survey) wrongType(e expression, err *toml.DecodeError) refusal.Reason {
	want := wanted(err.Error())
	r := refusal.Reason{
		Code: refusal.ValueWrongType, Severity: refusal.Refuse, Field: e.key, Pos: s.lines.at(s.lines.offset(err.Position())),
		Got: kindInWords(e.value), Want: want, Remedy: "write " + want,
	}
	if raw := shortened(e.raw); raw != "" && e.value != unstable.InlineTable {
		r.Got += " " + raw
	}
	r.Message = fmt.Sprintf("the value of %q is %s, where %s is wanted", e.short, kindInWords(e.value), r.Want)
	switch e.value {
	case unstable.Integer, unstable.Float:
		if strings.Contains(r.Want, "quotes") {
			r.Remedy = fmt.Sprintf(`write it in quotes and with its unit: %s = "%s …"`, e.short, e.raw)
		}
	case unstable.String:
		if word := strings.Trim(e.raw, `"'`); word == "true" || word == "false" {
			r.Remedy = fmt.Sprintf("write: %s = %s", e.short, word)
		}
	}
	return r
}

func (s *survey) wrongTable(e expression, err *toml.DecodeError) refusal.Reason {
	line, _ := err.Position()
	return refusal.Reason{
		Code: refusal.ValueWrongType, Severity: refusal.Refuse, Field: e.key,
		Message: fmt.Sprintf("the table %q has the wrong form of brackets, or a single value is wanted there", e.key),
		Got:     shortened(string(bytes.TrimSpace(s.lineText(line)))), Want: "[name] for a table of its own, [[name]] for one of several",
		Remedy: "change the brackets of this line", Pos: s.lines.at(s.lines.offset(err.Position())),
	}
}

func (s *survey) lineText(line int) []byte {
	if line < 1 || line > len(s.lines.starts) {
		return nil
	}
	from, to := s.lines.span(line - 1)
	return s.lines.text[from:to]
}

func kindInWords(k unstable.Kind) string {
	if bareMoment(k) {
		return "a bare date or time"
	}
	switch k {
	case unstable.String:
		return "a text"
	case unstable.Bool:
		return "true or false"
	case unstable.Integer, unstable.Float:
		return "a bare number"
	case unstable.Array:
		return "a list"
	case unstable.InlineTable:
		return "a table in braces"
	}
	return "something else"
}

// wanted reads out of the decoder's message what the key takes.
func wanted(message string) string {
	_, target, _ := strings.Cut(message, "into")
	target = strings.TrimSpace(target)
	for _, w := range [][2]string{{"[]string", "a list of texts, each in quotes"}, {"[]", "a table of its own"}, {"bool", "true or false without quotes"}, {"string", "a text in quotes"}, {"Text", "a text in quotes"}} {
		if strings.Contains(target, w[0]) {
			return w[1]
		}
	}
	return "another sort of value"
}
