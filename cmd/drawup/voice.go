package main

import (
	"fmt"
	"io"
	"strings"
	"unicode"
	"unicode/utf8"

	"drawup/dilution/refusal"
)

// unreadable holds the codes that say: the request itself cannot be read. All
// other refusals concern a request that was understood, a malformed number
// included: what is wrong with it, and what was meant, is told.
func unreadable(c refusal.Code) bool {
	switch c {
	case refusal.FileUnreadable, refusal.FileEmpty, refusal.FileTooLarge, refusal.FileNotText, refusal.FileSyntax,
		refusal.FlagMissing, refusal.FlagConflict, refusal.FlagUnknown:
		return true
	}
	return false
}

// exitCode is what the program ends with when it has the reasons l.
func exitCode(l refusal.List) int {
	code := exitMade
	for _, r := range l.Refusals() {
		switch {
		case r.Code == refusal.RoutesDisagree:
			return exitDisagree
		case unreadable(r.Code):
			code = exitUnreadable
		case code == exitMade:
			code = exitRefused
		}
	}
	return code
}

// speak writes the refusals of l for people, one after the other:
//
//	drawup: refused: weight-missing
//	  the dose rate is per kg and no body weight is given
//	  rule: R3
//	  do: add --weight "72 kg"
func speak(w io.Writer, l refusal.List) {
	for _, r := range l.Refusals() {
		fmt.Fprintf(w, "drawup: refused: %s\n", r.Code)
		details(w, r)
	}
}

// caution writes the cautions of l the same way, without the program's name:
// they belong to the answer.
func caution(w io.Writer, l refusal.List) {
	for _, r := range l.Cautions() {
		fmt.Fprintf(w, "caution: %s\n", r.Code)
		details(w, r)
	}
}

// details writes what follows the first line of a reason, indented.
func details(w io.Writer, r refusal.Reason) {
	place := r.Pos.String()
	if place != "" {
		place += ": "
	}
	if r.Syringe > 0 {
		place += fmt.Sprintf("syringe %d: ", r.Syringe)
	}
	fmt.Fprintf(w, "  %s%s\n", place, oneLine(r.Message))
	switch {
	case r.Rule != "" && r.Source != "":
		fmt.Fprintf(w, "  rule: %s; %s\n", oneLine(r.Rule), oneLine(r.Source))
	case r.Rule != "":
		fmt.Fprintf(w, "  rule: %s\n", oneLine(r.Rule))
	case r.Source != "":
		fmt.Fprintf(w, "  source: %s\n", oneLine(r.Source))
	}
	if r.Remedy != "" {
		fmt.Fprintf(w, "  do: %s\n", oneLine(r.Remedy))
	}
}

// oneLine keeps what was typed from breaking out of its line or from steering
// a terminal.
func oneLine(s string) string {
	return strings.Map(func(r rune) rune {
		if r < 0x20 || (r >= 0x7f && r < 0xa0) || unicode.Is(unicode.Cf, r) || r == utf8.RuneError {
			return ' '
		}
		return r
	}, s)
}

// finish writes an answer and its reasons and returns the exit code. With
// asJSON the whole document goes to standard output; sentences about refusals
// go to standard error either way. text may be nil when l refuses.
func finish(e env, asJSON bool, doc document, text func(io.Writer), l refusal.List) int {
	code := exitCode(l)
	speak(e.stderr, l)
	var out []byte
	if asJSON {
		doc.take(l)
		b, err := encode(doc)
		if err != nil {
			return outputFault(e, err)
		}
		out = b
	} else if code == exitMade {
		var b strings.Builder
		text(&b)
		caution(&b, l)
		out = []byte(b.String())
	}
	if _, err := e.stdout.Write(out); err != nil {
		return outputFault(e, err)
	}
	return code
}

func outputFault(e env, err error) int {
	speak(e.stderr, refusal.List{{
		Code: refusal.OutputUnwritable, Severity: refusal.Refuse,
		Message: "the answer cannot be written: " + err.Error(),
		Remedy:  "check where standard output goes",
	}})
	return exitUnreadable
}
