package main

import (
	"fmt"
	"regexp"
	"strings"
	"time"
	"unicode"

	"drawup/dilution/refusal"
	"drawup/labels"
	"drawup/labels/gs1"
)

// ruleOfCodes is the source of the rules for identifiers and their values.
const ruleOfCodes = "GS1 Barcode Syntax Dictionary"

// codeFault is a fault of a code as a refusal: what, where, which rule, what to
// do. The place is a character of the text, counted from 1.
func (r *readRequest) codeFault(f gs1.Fault, now time.Time) refusal.Reason {
	out := refusal.Reason{Severity: refusal.Refuse, Field: "code", Got: f.Got, Want: f.Want, Pos: refusal.Pos{Column: f.At}, Source: ruleOfCodes}
	where := ""
	if f.At > 0 {
		where = fmt.Sprintf("at character %d: ", f.At)
		out.Field = fmt.Sprintf("character %d", f.At)
	}
	if f.AI != "" {
		where += "(" + f.AI + "): "
		out.Source += ", line " + f.AI
	}
	out.Message = where + "got " + f.Got + ", want " + f.Want
	out.Code, out.Remedy = codeOf(f.Kind)
	switch f.Kind {
	case gs1.Empty:
		out.Source = ""
	case gs1.Foreign:
		out.Source = ruleOfCodes + "; ISO/IEC 15424 for what stands in front of a code"
	case gs1.Sign:
		out.Source += "; GS1 General Specifications, signs of a value"
	case gs1.Lost:
		out.Source = "GS1 General Specifications: a separator ends every value whose length is not predefined"
		out.Remedy = lostRemedy(r.text)
	case gs1.Content:
		out.Source = "labels of this program, internal identifiers 91 to 96"
		if wrongCase(r.text, now) {
			out.Remedy = "capital and small letters are swapped: turn Caps Lock off and scan again"
		}
	}
	return out
}

// codeOf is the code and the usual remedy of a fault.
func codeOf(k gs1.Kind) (refusal.Code, string) {
	const again = "scan again; if the fault stays, the code or the way to here is at fault: go by the words on the label"
	switch k {
	case gs1.Empty:
		return refusal.CodeEmpty, `scan a code, or type it in quotes: drawup read "(91)…"`
	case gs1.Foreign:
		return refusal.CodeForeign, "scan the square code of a label or a pack; other codes say nothing here"
	case gs1.Unknown:
		return refusal.CodeIdentifier, "if the scanner leaves separators out, set it to send GS (29) or <GS>; else " + again
	case gs1.Length:
		return refusal.CodeLength, "if the scanner leaves separators out, set it to send GS (29) or <GS>; else " + again
	case gs1.Sign:
		return refusal.CodeSign, "check the scanner's keyboard layout; letters with accents, blanks and # @ stand in no value"
	case gs1.WrongDigit:
		return refusal.CodeCheckDigit, "a digit was misread or mistyped: scan again, or compare with the number in print"
	case gs1.Moment:
		return refusal.CodeMoment, again
	case gs1.Pairing:
		return refusal.CodePairing, "scan every code of the pack: what it needs may stand in another one"
	case gs1.Repeated:
		return refusal.CodeRepeated, "two scans may have run together: scan again, one code at a time"
	case gs1.Content:
		return refusal.CodeContent, "it may be another house's code: go by the words on the label"
	case gs1.Lost:
		return refusal.CodeSeparator, again
	}
	return refusal.CodeForeign, again
}

// ownLabel is the internal form without its separators, each value of which has
// a length or an end of its own.
var ownLabel = regexp.MustCompile(`^(?:\]d2)?(?:[^0-9]*)91([A-Z]\d\d[A-Z][A-Z]\d\d)92(\d{18})93(\d+(?:\.\d+)?[a-z]+/mL)`)

// lostRemedy says how to get separators, and what the code probably says. Its
// reading is told, never used.
func lostRemedy(text string) string {
	remedy := "set the scanner to send the separator as GS (29) or <GS>, and scan again"
	bare := regexp.MustCompile(`\x1d|<GS>|\{GS\}|\[GS\]|<FNC1>|\{FNC1\}|\[FNC1\]|\^\]`).ReplaceAllString(strings.TrimSpace(text), "")
	if m := ownLabel.FindStringSubmatch(bare); m != nil {
		remedy += fmt.Sprintf("; the label probably says (91)%s(92)%s(93)%s: check that against its words", m[1], m[2], m[3])
	}
	return remedy
}

// wrongCase reports that the code reads well with capital and small letters
// swapped, as when Caps Lock is on.
func wrongCase(text string, now time.Time) bool {
	swapped := strings.Map(func(c rune) rune {
		if unicode.IsUpper(c) {
			return unicode.ToLower(c)
		}
		return unicode.ToUpper(c)
	}, text)
	s, faults := gs1.Scan(swapped)
	if len(faults) > 0 {
		return false
	}
	_, faults = labels.ReadCode(s, now)
	return len(faults) == 0
}
