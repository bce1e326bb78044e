package order

import (
	"fmt"
	"strings"
	"unicode"
	"unicode/utf8"

	"drawup/dilution/quantity/lint"
	"drawup/dilution/refusal"
)

// mostLetters bounds every text in words. The bound is our own, wide, and
// against what was pasted in by mistake: a line of a sheet holds about half.
const mostLetters = 200

// A wording is a text in a person's own words. It is held against the rules of
// numbers and units once the house style has been read.
type wording struct {
	path   []any
	text   string
	number int // the syringe, 0 outside
}

// A care is how strictly a text in a person's own words is judged.
type care int

const (
	asWords  care = iota + 1 // words about the work: each rule as it stands
	asName                   // a person, who may be called Neo
	asCopied                 // a number copied from elsewhere, which must not be altered
)

// careOf is how a key's text is judged. Keys whose text is looked up in the
// formulary are none of these.
func careOf(key string) (care, bool) {
	switch key {
	case "place", "weighed", "accepted_reason":
		return asWords, true
	case "preparer", "name", "accepted_by":
		return asName, true
	case "id", "batch":
		return asCopied, true
	}
	return 0, false
}

// printable refuses a text that no paper can show on a line: line ends, other
// control characters, the invisible marks that turn the direction of a text,
// pictures, and more letters than a sheet has room for.
func (r *reader) printable(s, text string, path []any) bool {
	reason := refusal.Reason{Got: s, Want: "words on one line", Code: refusal.ValueWrongType}
	if runes := []rune(s); len(runes) > 2*mostLetters {
		reason.Got = string(runes[:40]) + "…"
	}
	switch {
	case strings.ContainsFunc(text, unprintable):
		reason.Message = fmt.Sprintf("the %s runs over several lines or holds a character that cannot be seen", named(key(path)))
		reason.Remedy = "write it on one line"
	case strings.ContainsFunc(text, pictured):
		reason.Message = fmt.Sprintf("the %s holds a picture, which no label can print", named(key(path)))
		reason.Remedy = "write it in words"
	case utf8.RuneCountInString(text) > mostLetters:
		reason.Code, reason.Rule = refusal.TextTooLong, "R15"
		reason.Message = fmt.Sprintf("the %s has %d letters", named(key(path)), utf8.RuneCountInString(text))
		reason.Want = fmt.Sprintf("at most %d letters, a bound of our own", mostLetters)
		reason.Remedy = "shorten it to what a reader needs"
	default:
		return true
	}
	r.refuse(path, reason)
	return false
}

// unprintable are line ends, other control characters and the invisible marks
// that turn the direction of a text: paper would not show what was typed.
func unprintable(c rune) bool { return unicode.IsControl(c) || unicode.Is(unicode.Cf, c) }

// pictured are emoji and their like: symbols beyond those of Latin text, what
// chooses their looks, and letters for private use.
func pictured(c rune) bool {
	return unicode.Is(unicode.So, c) && c > unicode.MaxLatin1 || c >= 0xFE00 && c <= 0xFE0F || unicode.Is(unicode.Sk, c) && c > 0xFFFF || unicode.Is(unicode.Co, c)
}

// remember keeps a text for wordings.
func (r *reader) remember(text string, path []any) {
	if _, ok := careOf(key(path)); ok {
		r.wordings = append(r.wordings, wording{path, text, r.number})
	}
}

// hold judges every text in a person's own words by the rules N01 to N28 in the
// site's house style (rule R14).
func (r *reader) hold() {
	house, ok := lint.Named(r.order.Site.Style.Value.String())
	if !ok {
		house = lint.UK()
	}
	for _, w := range r.wordings {
		r.number = w.number
		how, _ := careOf(key(w.path))
		for _, f := range house.Typed(w.text) {
			r.misread(w, how, f)
		}
	}
	r.number = 0
}

// named is a key of a person's words as sentences name it.
func named(key string) string {
	switch key {
	case "id", "name":
		return "patient's " + key
	case "weighed":
		return "note on weighing"
	case "accepted_by":
		return "name of who accepts"
	case "accepted_reason":
		return "reason for accepting"
	}
	return spaced(key)
}

// misread tells one finding. The sentence of a caution stands on sheets: it has
// no figure that a second route could not confirm.
func (r *reader) misread(w wording, how care, f lint.Finding) {
	field := named(key(w.path))
	reason := refusal.Reason{Code: refusal.TextMisread, Got: f.Got, Want: f.Rule.Says, Rule: "R14, " + f.Rule.Code, Source: f.Rule.Source}
	if f.Severity == lint.Warn || how == asCopied || how == asName && f.Rule.Code == "N12" {
		reason.Message = fmt.Sprintf("the %s has %s; it is printed as it was typed", field, f.Rule.Fault)
		reason.Remedy = "see whether it can be misread"
		if how == asCopied {
			reason.Remedy = "hold it against what it was copied from"
		}
		r.caution(w.path, reason)
		return
	}
	reason.Message = fmt.Sprintf("the %s has %s: %q", field, f.Rule.Fault, f.Got)
	reason.Remedy = "write " + f.Rule.Says
	if f.Fix != "" {
		reason.Remedy = fmt.Sprintf("write %q, if that is meant", f.Fix)
	}
	r.refuse(w.path, reason)
}
