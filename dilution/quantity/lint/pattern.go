package lint

import "regexp"

// Pieces of expressions.
const (
	// gap may stand between a number and its unit.
	gap = `[ \x{00A0}\x{2009}\x{202F}]?`
	// blank parts two words.
	blank = `[ \x{00A0}\x{2009}\x{202F}]`
	// doseUnit is a unit in which a drug or a volume is counted, in all the
	// spellings that are met.
	doseUnit = `(?:mg|g|kg|mcg|ng|micrograms?|nanograms?|milligrams?|grams?|mL|ml|L|units?|milliunits?|mmol|micromol|mEq)`
	// number is a decimal number, grouped or not.
	number = `\d+(?:[,\x{00A0}\x{202F}]\d{3})*(?:\.\d+)?`
)

// each finds every match of an expression. The first group of it is the faulty
// part, the whole match where it has none; fix may be nil.
func each(expression string, fix func(h House, groups []string) string) func(House, string) []match {
	return eachIf(expression, nil, fix)
}

// eachIf is each for the matches that ok, if not nil, says are faults.
func eachIf(expression string, ok func(groups []string) bool, fix func(h House, groups []string) string) func(House, string) []match {
	re := regexp.MustCompile(expression)
	return func(h House, text string) []match {
		var out []match
		for _, at := range re.FindAllStringSubmatchIndex(text, -1) {
			if ok != nil && !ok(groupsOf(text, at)) {
				continue
			}
			m := match{from: at[0], to: at[1]}
			if len(at) > 2 && at[2] >= 0 {
				m.from, m.to = at[2], at[3]
			}
			if fix != nil {
				m.fix = fix(h, groupsOf(text, at))
			}
			out = append(out, m)
		}
		return out
	}
}

func groupsOf(text string, at []int) []string {
	out := make([]string, len(at)/2)
	for i := range out {
		if at[2*i] >= 0 {
			out[i] = text[at[2*i]:at[2*i+1]]
		}
	}
	return out
}

// all joins finders.
func all(finders ...func(House, string) []match) func(House, string) []match {
	return func(h House, text string) []match {
		var out []match
		for _, f := range finders {
			out = append(out, f(h, text)...)
		}
		return out
	}
}

// graded gives all matches of a finder another severity.
func graded(s Severity, find func(House, string) []match) func(House, string) []match {
	return func(h House, text string) []match {
		out := find(h, text)
		for i := range out {
			out[i].more = s
		}
		return out
	}
}

// only lets a finder work in some houses.
func only(find func(House, string) []match, names ...string) func(House, string) []match {
	return func(h House, text string) []match {
		for _, n := range names {
			if n == h.name {
				return find(h, text)
			}
		}
		return nil
	}
}
