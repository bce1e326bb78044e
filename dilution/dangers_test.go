package dilution_test

import (
	"slices"
	"strings"
	"testing"

	"drawup/dilution/refusal"
)

// A danger is one item of a list of what must never be made: the order that asks
// for it, the refusal that must come, and, where there is one, the change that
// makes the order right, so that the refusal is of the danger and of nothing else.
type danger struct {
	item   string       // as the list has it; the name of its test
	source string       // the document behind the item
	table  string       // syringe or infusion
	order  string       // "drug: etomidate; dose: 62 mg"
	want   refusal.Code // among the refusals
	right  string       // keys that replace those of the order; "": nothing does
	who    string       // the patient; "": an adult of 70 kg
}

// An infant of 10 kg, a newborn of 3 kg, and an elderly adult, all invented.
const (
	infant  = "\n[[patient]]\nid = \"A\"\nsex = \"male\"\nage = \"12 months\"\nheight = \"76 cm\"\nweight = \"10 kg\"\n"
	newborn = "\n[[patient]]\nid = \"A\"\nsex = \"male\"\nage = \"5 days\"\nheight = \"50 cm\"\nweight = \"3 kg\"\n"
	child   = "\n[[patient]]\nid = \"A\"\nsex = \"male\"\nage = \"5 years\"\nheight = \"110 cm\"\nweight = \"20 kg\"\n"
)

// asked turns "drug: etomidate; dose: 62 mg" into lines of an order; keys of
// change replace those of order, and a key without a value goes.
func asked(t *testing.T, order, change string) string {
	t.Helper()
	var names []string
	values := map[string]string{}
	for _, text := range []string{order, change} {
		if text == "" {
			continue
		}
		for part := range strings.SplitSeq(text, "; ") {
			name, value, ok := strings.Cut(part, ": ")
			if !ok {
				t.Fatalf("got %q, want key: value", part)
			}
			if !slices.Contains(names, name) {
				names = append(names, name)
			}
			values[name] = value
		}
	}
	var out strings.Builder
	for _, n := range names {
		if values[n] != "-" {
			out.WriteString(key(n, values[n]) + "\n")
		}
	}
	return out.String()
}

// run wants every danger of a list refused, and its right form made.
func run(t *testing.T, list []danger) {
	f := starter(t)
	seen := map[string]bool{}
	for _, d := range list {
		if seen[d.item] || d.source == "" {
			t.Errorf("%q stands twice or has no source", d.item)
		}
		seen[d.item] = true
		who := d.who
		if who == "" {
			who = adult
		}
		t.Run(d.item, func(t *testing.T) {
			got := codesOf(t, f, who, d.table, asked(t, d.order, ""))
			if !slices.Contains(got, d.want) {
				t.Errorf("%s: got %v, want %s (%s)", d.order, got, d.want, d.source)
			}
			if d.right == "" {
				return
			}
			if got := codesOf(t, f, who, d.table, asked(t, d.order, d.right)); len(got) > 0 {
				t.Errorf("%s, with %s: got %v, want it made", d.order, d.right, got)
			}
		})
	}
}
