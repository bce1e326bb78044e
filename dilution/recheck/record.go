package recheck

import (
	"fmt"
	"strings"
)

// mostRecord bounds the formulary text that is searched, in bytes.
const mostRecord = 16 << 20

// A record is the lines of one drug and of one of its presentations, found
// again in the raw text of the formulary.
type record struct {
	problem string
	own     map[string]string
	pack    map[string]string
	packs   []block // all presentations of the drug
	place   place
}

// A place says where a drug's lines stand: in a piece of the raw text, as the
// nth of so many drugs, counted from 0.
type place struct {
	piece   string
	nth, of int
}

func (r record) presentation(key string) (string, string) { return r.line(r.pack, key) }
func (r record) drug(key string) (string, string)         { return r.line(r.own, key) }

func (r record) line(lines map[string]string, key string) (string, string) {
	if r.problem != "" {
		return "", r.problem
	}
	text, ok := lines[key]
	if !ok {
		return "", "the record has no line " + key
	}
	return text, ""
}

// holds says whether the presentation has a line of this key.
func (r record) holds(key string) bool {
	_, ok := r.pack[key]
	return r.problem == "" && ok
}

// size is the same drug's record with another of its presentations.
func (r record) size(id string) (record, string) {
	if r.problem != "" {
		return record{}, r.problem
	}
	pack, problem := onePack(r.packs, id)
	if problem != "" {
		return record{}, problem
	}
	r.pack = pack.lines
	return r, ""
}

// onePack is the one presentation with this id; two of them, and a line that
// stands twice, are problems.
func onePack(packs []block, id string) (block, string) {
	var found []block
	for _, p := range packs {
		if p.lines["id"] == id && id != "" {
			found = append(found, p)
		}
	}
	if len(found) != 1 {
		return block{}, fmt.Sprintf("the record holds %d presentations %q, want one", len(found), id)
	}
	if found[0].twice != "" {
		return block{}, "the record has a line twice: " + found[0].twice
	}
	return found[0], ""
}

// A block is one table of the record: the header it stands under and its lines.
type block struct {
	lines map[string]string
	twice string
}

// A drugBlock is a drug with its presentations.
type drugBlock struct {
	block
	packs []block
	place place
}

// findRecord looks up the drug by name and the presentation by id. Two of the
// same name, and a key that stands twice, are problems: nothing is chosen.
func findRecord(raw []byte, drug, presentation string) record {
	if len(raw) > mostRecord {
		return record{problem: "the record is too long to be searched"}
	}
	found := drugsNamed(string(raw), drug)
	if len(found) != 1 {
		return record{problem: fmt.Sprintf("the record holds %d drugs named %q, want one", len(found), drug)}
	}
	if key := found[0].twice; key != "" {
		return record{problem: fmt.Sprintf("the record of %q has a line twice: %s", drug, key)}
	}
	pack, problem := onePack(found[0].packs, presentation)
	if problem != "" {
		return record{problem: fmt.Sprintf("drug %q: %s", drug, problem)}
	}
	return record{own: found[0].lines, pack: pack.lines, packs: found[0].packs, place: found[0].place}
}

// drugsNamed cuts the text at its [[drug]] lines and reads only the pieces in
// which the name stands in quotes, so that a long formulary costs little.
func drugsNamed(text, name string) []drugBlock {
	const cut = "\n[[drug]]"
	var found []drugBlock
	for text != "" && name != "" {
		piece, rest := text, ""
		if at := strings.Index(text[1:], cut); at >= 0 {
			piece, rest = text[:at+1], text[at+1:]
		}
		text = rest
		if !strings.Contains(piece, `"`+name+`"`) && !strings.Contains(piece, "'"+name+"'") {
			continue
		}
		drugs := readBlocks(piece)
		for i, d := range drugs {
			if d.lines["name"] == name {
				d.place = place{piece: piece, nth: i, of: len(drugs)}
				found = append(found, d)
			}
		}
	}
	return found
}

// readBlocks walks the text line by line. Only [[drug]] and
// [[drug.presentation]] are kept; lines under any other header are passed over.
func readBlocks(text string) []drugBlock {
	var drugs []drugBlock
	current := (*block)(nil)
	closing := ""
	for _, line := range strings.Split(text, "\n") {
		line = strings.TrimSpace(line)
		if closing != "" {
			if strings.Contains(line, closing) {
				closing = ""
			}
			continue
		}
		if strings.HasPrefix(line, "[") {
			drugs, current = openBlock(drugs, line)
			continue
		}
		key, rest, found := strings.Cut(line, "=")
		if !found || strings.HasPrefix(line, "#") {
			continue
		}
		rest = strings.TrimSpace(rest)
		if mark := longString(rest); mark != "" {
			closing = mark
			continue
		}
		if current != nil {
			current.keep(strings.TrimSpace(key), rest)
		}
	}
	return drugs
}

// openBlock starts the block that a header line names.
func openBlock(drugs []drugBlock, line string) ([]drugBlock, *block) {
	header, _, _ := strings.Cut(line, "#")
	switch strings.TrimSpace(header) {
	case "[[drug]]":
		drugs = append(drugs, drugBlock{block: block{lines: map[string]string{}}})
		return drugs, &drugs[len(drugs)-1].block
	case "[[drug.presentation]]":
		if len(drugs) == 0 {
			return drugs, nil
		}
		d := &drugs[len(drugs)-1]
		d.packs = append(d.packs, block{lines: map[string]string{}})
		return drugs, &d.packs[len(d.packs)-1]
	}
	return drugs, nil
}

func (b *block) keep(key, rest string) {
	text, ok := quoted(rest)
	if !ok {
		text, ok = inlineValue(rest)
	}
	if !ok {
		return
	}
	if _, known := b.lines[key]; known {
		b.twice = key
	}
	b.lines[key] = text
}

// longString says which mark closes a text of several lines that opens here
// and does not close here.
func longString(rest string) string {
	for _, mark := range []string{`"""`, "'''"} {
		if strings.HasPrefix(rest, mark) && !strings.Contains(rest[len(mark):], mark) {
			return mark
		}
	}
	return ""
}

// quoted reads a text in single or double quotes at the start of rest. A text
// with a backslash in it is not read: the lines looked for hold none.
func quoted(rest string) (string, bool) {
	if rest == "" || (rest[0] != '"' && rest[0] != '\'') {
		return "", false
	}
	text, after, found := strings.Cut(rest[1:], rest[:1])
	after = strings.TrimSpace(after)
	if !found || strings.Contains(text, `\`) || (after != "" && after[0] != '#') {
		return "", false
	}
	return text, true
}

// inlineValue reads { value = "20 mg", source = "…" } and gives the value. The
// words between quotes are skipped whole, so that none of them is taken for a
// key.
func inlineValue(rest string) (string, bool) {
	if !strings.HasPrefix(rest, "{") {
		return "", false
	}
	rest = strings.TrimSpace(rest[1:])
	for rest != "" && rest[0] != '}' {
		key, after, found := strings.Cut(rest, "=")
		if !found {
			return "", false
		}
		after = strings.TrimSpace(after)
		text, tail, ok := inlineText(after)
		if !ok {
			return "", false
		}
		if strings.TrimSpace(key) == "value" {
			return text, true
		}
		rest = strings.TrimSpace(strings.TrimPrefix(strings.TrimSpace(tail), ","))
	}
	return "", false
}

// inlineText takes one value off an inline table: a text in quotes, or a bare
// word up to the next comma or brace.
func inlineText(after string) (text, tail string, ok bool) {
	if after == "" {
		return "", "", false
	}
	if after[0] == '\'' || after[0] == '"' {
		mark := after[0]
		for i := 1; i < len(after); i++ {
			if after[i] == '\\' && mark == '"' {
				i++
				continue
			}
			if after[i] == mark {
				return after[1:i], after[i+1:], true
			}
		}
		return "", "", false
	}
	end := strings.IndexAny(after, ",}")
	if end < 0 {
		return "", "", false
	}
	return strings.TrimSpace(after[:end]), after[end:], true
}
