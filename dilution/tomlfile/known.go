package tomlfile

import (
	"fmt"
	"strings"

	"github.com/pelletier/go-toml/v2"

	"drawup/dilution/refusal"
)

// unknown explains every key that the struct does not have.
func (s *survey) unknown(missing *toml.StrictMissingError, known []string) refusal.List {
	var list refusal.List
	for i := range missing.Errors {
		if len(list) >= maxFaults {
			break
		}
		e := &missing.Errors[i]
		offset := s.lines.offset(e.Position())
		path := []string(e.Key())
		r := refusal.Reason{Code: refusal.KeyUnknown, Severity: refusal.Refuse,
			Field: strings.Join(path, "."), Want: "a key that this table has", Remedy: "take the line out", Pos: s.lines.at(offset)}
		if len(path) == 0 {
			list = append(list, r)
			continue
		}
		key, table := path[len(path)-1], path[:len(path)-1]
		r.Got = key
		r.Message = fmt.Sprintf("there is no key %q here", key)
		if len(table) > 0 {
			r.Message = fmt.Sprintf("there is no key %q in %q", key, strings.Join(table, "."))
		}
		if likely := likelyKey(key, table, known); likely != "" {
			r.Want, r.Remedy = likely, fmt.Sprintf("write %q, if that is meant", likely)
			s.noteLikely(offset, likely)
		} else if home := homeOf(key, known); home != "" {
			r.Want, r.Remedy = home, fmt.Sprintf("move it: the key is %q", home)
		}
		list = append(list, r)
	}
	return list
}

// miscased explains the keys that differ from a known one in letter case only.
// TOML tells them apart, the decoder does not.
func (s *survey) miscased(known []string) refusal.List {
	exact, lower := map[string]bool{}, map[string]string{}
	for _, k := range known {
		name := k[strings.LastIndexByte(k, '.')+1:]
		exact[name] = true
		lower[strings.ToLower(name)] = name
	}
	var list refusal.List
	for _, k := range s.spelled {
		name, ok := lower[strings.ToLower(k.name)]
		if !ok || exact[k.name] || len(list) >= maxFaults {
			continue
		}
		list = append(list, refusal.Reason{Code: refusal.KeyUnknown, Severity: refusal.Refuse, Field: k.key, Got: k.name, Want: name,
			Message: fmt.Sprintf("there is no key %q; capital and small letters are not the same", k.name),
			Remedy:  fmt.Sprintf("write %q, if that is meant", name), Pos: s.lines.at(k.at)})
	}
	return list
}

// noteLikely gives the key that was probably meant the place of the misspelt
// one, so that it is not called missing as well. A misspelt table hides all its
// keys.
func (s *survey) noteLikely(offset int, likely string) {
	table, ok := s.parents[offset]
	if !ok {
		return
	}
	s.places.set(table+named(likely), s.lines.at(offset))
	if e, ok := s.expressionAt(offset); ok && e.header {
		s.places.whole = false
	}
}

// likelyKey is the key of the same table that is nearest in spelling, or "".
func likelyKey(key string, table, known []string) string {
	best, likely := len(key)/3+1, ""
	for _, k := range known {
		parts := strings.Split(k, ".")
		if len(parts) != len(table)+1 || !sameTable(parts[:len(table)], table) {
			continue
		}
		name := parts[len(table)]
		if d := distance(strings.ToLower(key), name); d <= best && name != "*" && (likely == "" || d < best) {
			best, likely = d, name
		}
	}
	return likely
}

func sameTable(pattern, table []string) bool {
	for i := range pattern {
		if pattern[i] != "*" && pattern[i] != table[i] {
			return false
		}
	}
	return true
}

// homeOf is the full key of another table that has this name, if only one has.
func homeOf(key string, known []string) string {
	home := ""
	for _, k := range known {
		if strings.HasSuffix(k, "."+key) {
			if home != "" {
				return ""
			}
			home = k
		}
	}
	return home
}

// distance counts the letters to change, add, leave out or swap with a
// neighbour to turn a into b.
func distance(a, b string) int {
	before, last := make([]int, len(b)+1), make([]int, len(b)+1)
	for j := range last {
		last[j] = j
	}
	for i := 1; i <= len(a); i++ {
		now := make([]int, len(b)+1)
		now[0] = i
		for j := 1; j <= len(b); j++ {
			change := last[j-1]
			if a[i-1] != b[j-1] {
				change++
			}
			now[j] = min(change, last[j]+1, now[j-1]+1)
			if i > 1 && j > 1 && a[i-1] == b[j-2] && a[i-2] == b[j-1] {
				now[j] = min(now[j], before[j-2]+1)
			}
		}
		before, last = last, now
	}
	return last[len(b)]
}
