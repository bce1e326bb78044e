package recheck

import (
	"fmt"
	"strings"
)

// A Fault is one printed figure that the second route does not confirm.
//
// Paper names the papers it stands on, Printed is its text, Gets is what the
// second route works out instead (empty where it can work out nothing), and
// Sentence says why in words.
type Fault struct {
	Syringe  string
	Paper    string
	Name     string
	Printed  string
	Gets     string
	Sentence string
}

// A Disagreement holds every fault of one syringe, in the order in which the
// figures were stated. It is the error of Check; it means that nothing may be
// printed (rule R17).
type Disagreement struct {
	Faults []Fault
}

// Error writes one line a fault, the figure as printed first.
func (d *Disagreement) Error() string {
	var b strings.Builder
	figures := "figures"
	if len(d.Faults) == 1 {
		figures = "figure"
	}
	fmt.Fprintf(&b, "the two routes disagree on %d %s; nothing may be printed", len(d.Faults), figures)
	for _, f := range d.Faults {
		b.WriteString("\n  " + f.line())
	}
	return b.String()
}

func (f Fault) line() string {
	line := fmt.Sprintf("syringe %q", f.Syringe)
	if f.Paper != "" {
		line += ", " + f.Paper
	}
	if f.Name != "" {
		line += ": " + f.Name + " prints " + fmt.Sprintf("%q", f.Printed)
	}
	if f.Gets != "" {
		line += ", the second route gets " + f.Gets
	}
	if f.Sentence != "" {
		line += ": " + f.Sentence
	}
	return line
}
