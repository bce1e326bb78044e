// Package refusal names and explains every refusal and caution of the project:
// code, place, got, want, rule, source and what to do. All reasons are given
// at once; nothing is written when one of them refuses.
package refusal

import (
	"fmt"
	"sort"
	"strings"
)

// A Severity says whether a reason stops the work. Its zero value is invalid.
type Severity int

// Severities.
const (
	Refuse  Severity = iota + 1 // nothing is made
	Caution                     // made, and printed on the papers
)

func (s Severity) String() string {
	switch s {
	case Refuse:
		return "refused"
	case Caution:
		return "caution"
	}
	return "severity not set"
}

// A Pos is a place in a file. The zero value is no place.
type Pos struct {
	File         string
	Line, Column int
}

// String is "file:line:column", shorter when parts are missing, "" for none.
func (p Pos) String() string {
	switch {
	case p.File == "" && p.Line == 0:
		return ""
	case p.Line == 0:
		return p.File
	case p.Column == 0:
		return fmt.Sprintf("%s:%d", p.File, p.Line)
	}
	return fmt.Sprintf("%s:%d:%d", p.File, p.Line, p.Column)
}

// A Reason is one reason not to make a syringe, or one caution that goes with
// it. Message is a whole sentence for a tired person, without the code.
type Reason struct {
	Code     Code
	Severity Severity
	Syringe  int      // number in making order, 0 when it concerns the whole order
	Message  string   // what is wrong, in words
	Field    string   // the field in the user's words, "patient.weight"
	Got      string   // what was read or worked out
	Want     string   // what is allowed
	Rule     string   // "R8"
	Source   string   // where the limit comes from, spelled out
	Remedy   string   // what to do
	Instead  *Instead // what can be made in its place; nil where nothing was found or looked for
	Pos      Pos
}

// Error is the reason in one line, so that a Reason can travel as an error.
func (r Reason) Error() string {
	s := string(r.Code) + ": " + r.Message
	if p := r.Pos.String(); p != "" {
		s = p + ": " + s
	}
	return s
}

// A List is a set of reasons, kept in the order of the order file.
type List []Reason

// Refused reports whether any reason of the list stops the work.
func (l List) Refused() bool {
	for _, r := range l {
		if r.Severity != Caution {
			return true
		}
	}
	return false
}

// Refusals is the part of l that stops the work.
func (l List) Refusals() List { return l.only(func(r Reason) bool { return r.Severity != Caution }) }

// Cautions is the part of l that is printed and does not stop the work.
func (l List) Cautions() List { return l.only(func(r Reason) bool { return r.Severity == Caution }) }

// Of is the part of l that concerns syringe n.
func (l List) Of(n int) List { return l.only(func(r Reason) bool { return r.Syringe == n }) }

func (l List) only(keep func(Reason) bool) List {
	var out List
	for _, r := range l {
		if keep(r) {
			out = append(out, r)
		}
	}
	return out
}

// Sort puts the reasons in order of place, then of syringe; it keeps the order
// of equals.
func (l List) Sort() {
	sort.SliceStable(l, func(i, j int) bool {
		a, b := l[i], l[j]
		if a.Pos.Line != b.Pos.Line {
			return a.Pos.Line < b.Pos.Line
		}
		if a.Pos.Column != b.Pos.Column {
			return a.Pos.Column < b.Pos.Column
		}
		return a.Syringe < b.Syringe
	})
}

// Error lists all reasons, one a line.
func (l List) Error() string {
	lines := make([]string, len(l))
	for i, r := range l {
		lines[i] = r.Error()
	}
	return strings.Join(lines, "\n")
}

// Codes is the set of codes in l, sorted.
func (l List) Codes() []Code {
	seen := map[Code]bool{}
	var out []Code
	for _, r := range l {
		if !seen[r.Code] {
			seen[r.Code] = true
			out = append(out, r.Code)
		}
	}
	sort.Slice(out, func(i, j int) bool { return out[i] < out[j] })
	return out
}
