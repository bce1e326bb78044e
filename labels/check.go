package labels

import (
	"fmt"
	"strings"
	"unicode"

	"drawup/dilution/recheck"
	"drawup/dilution/refusal"
)

// Check lists what the label lacks before anybody thinks of its size: nil if
// nothing. Rule R15 and label-rules 5.4.2 of ISO 26825:2020.
func (l Label) Check() refusal.List {
	var out refusal.List
	lacks := func(field, want string) {
		out = append(out, refusal.Reason{Code: refusal.KeyMissing, Severity: refusal.Refuse, Syringe: l.Number,
			Message: "The label lacks its " + field + ".", Field: field, Got: "nothing", Want: want, Rule: "R15"})
	}
	if _, ok := ClassOf(l.Class.Code); !ok {
		lacks("class", "one of the label classes")
	}
	if l.Name == "" {
		lacks("drug name", "the drug's name")
	}
	if l.Concentration.Text == "" || l.Concentration.Figure != recheck.Concentration {
		lacks("concentration", "the figure with its unit per mL")
	}
	if l.Second != "" && (l.SecondConcentration.Text == "" || l.SecondConcentration.Figure != recheck.SecondConcentrated) {
		lacks("concentration of the second drug", "the figure with its unit per mL")
	}
	if !has(l.UseBy, recheck.UseBy) {
		lacks("use-by", "date and time")
	}
	if l.Infusion {
		for _, f := range []struct {
			name  string
			there bool
		}{{"amount", len(l.Amount) > 0}, {"diluent", len(l.Diluent) > 0}, {"route", l.Route != ""}, {"time of preparation", len(l.Prepared) > 0}} {
			if !f.there {
				lacks(f.name, "it printed, as on every infusion label")
			}
		}
	}
	for _, name := range []string{l.Name, l.Second} {
		if why := badCase(name, name == l.Second); why != "" {
			out = append(out, refusal.Reason{Code: refusal.ValueUnknown, Severity: refusal.Refuse, Syringe: l.Number,
				Message: fmt.Sprintf("The drug name %q cannot be printed: %s.", name, why), Field: "drug name", Got: name,
				Want:   "an initial capital and small letters, or a mixed-case form from a list",
				Source: "ISO 26825:2020, 5.4.2", Remedy: "correct the name in the formulary"})
		}
	}
	return out
}

func has(l Line, figure string) bool {
	for _, c := range l {
		if c.Figure == figure && c.Text != "" {
			return true
		}
	}
	return false
}

// badCase says why a name breaks ISO 26825:2020, 5.4.2: all capitals never;
// either an initial capital with small letters or a mixed-case form. A form of
// more than 80 % capitals is taken for all capitals (the highest of the public
// lists has 79 %). The second of two names follows "with" and may be in small
// letters. Scripts without letter case are free.
func badCase(name string, second bool) string {
	capitals, small := 0, 0
	for _, r := range name {
		switch {
		case unicode.IsUpper(r):
			capitals++
		case unicode.IsLower(r):
			small++
		}
	}
	switch {
	case strings.TrimSpace(name) != name:
		return "it begins or ends with a blank"
	case capitals+small == 0:
		return ""
	case capitals*5 > (capitals+small)*4:
		return "it is in capitals throughout or nearly so"
	case capitals == 0 && !second:
		return "it is in small letters throughout"
	}
	return ""
}
