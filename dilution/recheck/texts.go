package recheck

import (
	"slices"
	"strconv"
	"strings"
	"unicode/utf8"
)

// This file reads every text in quotes that stands in one drug's block of the
// record: its own lines and those of all tables below it.

// texts lists them, or says why they cannot be read. Two readers that count the
// drugs of a piece differently have not understood it; then nothing is taken.
func (p place) texts() ([]string, bool) {
	return walkThrough(p.piece, "drug", p.nth, p.of)
}

// walkThrough lists the texts of the block of this table that stands at want,
// counted from 0, or says that the piece does not hold of such blocks.
func walkThrough(piece, table string, want, of int) ([]string, bool) {
	w := walk{left: piece, table: table, at: -1, fresh: true, want: want}
	for w.left != "" {
		if !w.step() {
			return nil, false
		}
	}
	if w.at+1 != of {
		return nil, false
	}
	return w.found, true
}

// pairTexts is every text of the [[mix]] blocks that name both drugs, in any of
// the files.
func pairTexts(files [][]byte, drug, other string) []string {
	const head = "\n[[mix]]"
	var out []string
	for _, raw := range files {
		if len(raw) > mostRecord {
			continue
		}
		text := "\n" + string(raw)
		for at := strings.Index(text, head); at >= 0; at = strings.Index(text, head) {
			text = text[at+1:]
			piece := text
			if end := strings.Index(text, "\n[["); end >= 0 {
				piece = text[:end+1]
			}
			texts, ok := walkThrough(piece, "mix", 0, 1)
			if ok && slices.Contains(texts, drug) && slices.Contains(texts, other) {
				out = append(out, texts...)
			}
		}
	}
	return out
}

// A walk is the way through the piece: which block of the table it is in, whether
// under one of that block's headers, how deep in brackets, and whether a line has
// begun.
type walk struct {
	left   string
	table  string
	at     int
	inside bool
	depth  int
	fresh  bool
	want   int
	found  []string
}

func (w *walk) step() bool {
	switch b := w.left[0]; b {
	case '\n':
		w.fresh = true
		w.left = w.left[1:]
		return true
	case ' ', '\t', '\r':
		w.left = w.left[1:]
		return true
	case '#':
		w.line()
		return true
	case '"', '\'':
		w.fresh = false
		return w.text()
	case '[', '{':
		if b == '[' && w.fresh && w.depth == 0 {
			w.header(w.line())
			return true
		}
		w.depth++
	case ']', '}':
		w.depth--
	}
	w.fresh = false
	w.left = w.left[1:]
	return w.depth >= 0
}

// line takes the rest of the line, without its end.
func (w *walk) line() string {
	end := strings.IndexByte(w.left, '\n')
	if end < 0 {
		end = len(w.left)
	}
	text := w.left[:end]
	w.left = w.left[end:]
	return text
}

func (w *walk) header(line string) {
	name, _, _ := strings.Cut(line, "#")
	name = strings.TrimSpace(name)
	if name == "[["+w.table+"]]" {
		w.at++
		w.inside = true
		return
	}
	w.inside = w.at >= 0 && strings.HasPrefix(strings.TrimLeft(name, "["), w.table+".")
}

// text takes one text in quotes and keeps it unless it is a key.
func (w *walk) text() bool {
	text, rest, ok := tomlText(w.left)
	if !ok {
		return false
	}
	w.left = rest
	after := strings.TrimLeft(rest, " \t")
	key := after != "" && (after[0] == '=' || after[0] == '.')
	if w.inside && w.at == w.want && !key {
		w.found = append(w.found, text)
	}
	return true
}

// tomlText takes one text in quotes off the front: basic or literal, of one
// line or of several.
func tomlText(from string) (text, rest string, ok bool) {
	mark, literal, long := from[:1], from[0] == '\'', false
	if strings.HasPrefix(from, strings.Repeat(mark, 3)) {
		mark, long = strings.Repeat(mark, 3), true
	}
	from = from[len(mark):]
	if long {
		from = strings.TrimPrefix(strings.TrimPrefix(from, "\r"), "\n")
	}
	var b strings.Builder
	for from != "" {
		switch {
		case strings.HasPrefix(from, mark):
			return b.String(), from[len(mark):], true
		case from[0] == '\n' && !long:
			return "", "", false
		case from[0] == '\\' && !literal:
			said, after, ok := escape(from[1:], long)
			if !ok {
				return "", "", false
			}
			b.WriteString(said)
			from = after
		default:
			b.WriteByte(from[0])
			from = from[1:]
		}
	}
	return "", "", false
}

// escape reads what stands behind a backslash of a basic text.
func escape(from string, long bool) (said, rest string, ok bool) {
	if from == "" {
		return "", "", false
	}
	switch from[0] {
	case 'b':
		return "\b", from[1:], true
	case 't':
		return "\t", from[1:], true
	case 'n':
		return "\n", from[1:], true
	case 'f':
		return "\f", from[1:], true
	case 'r':
		return "\r", from[1:], true
	case '"', '\\':
		return from[:1], from[1:], true
	case 'u':
		return codePoint(from[1:], 4)
	case 'U':
		return codePoint(from[1:], 8)
	case '\n', ' ', '\t', '\r':
		// A backslash at the end of a line takes the blanks that follow with it.
		blank := from[:len(from)-len(strings.TrimLeft(from, " \t\r\n"))]
		return "", from[len(blank):], long && strings.Contains(blank, "\n")
	}
	return "", "", false
}

func codePoint(from string, digits int) (said, rest string, ok bool) {
	if len(from) < digits {
		return "", "", false
	}
	n, err := strconv.ParseUint(from[:digits], 16, 32)
	if err != nil || n > utf8.MaxRune || !utf8.ValidRune(rune(n)) {
		return "", "", false
	}
	return string(rune(n)), from[digits:], true
}
