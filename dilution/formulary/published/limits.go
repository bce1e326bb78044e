package published

import (
	"fmt"
	"math/big"
	"slices"
	"strings"

	"drawup/dilution/formulary"
)

// kinds are those of the tables of second sources.
var kinds = []string{"concentration low", "concentration high", "rate low", "rate high", "dose low", "dose high", "total max"}

// readLimit reads one row of the tables of second sources.
func (t *Tables) readLimit(cells []string) error {
	if len(cells) != 4 || cells[3] == "" || !slices.Contains(kinds, cells[1]) {
		return fmt.Errorf("got %q, want a drug, one of %s, a figure and its source", cells, strings.Join(kinds, ", "))
	}
	f, err := parse(cells[2])
	if err != nil {
		return err
	}
	t.limits[cells[0]] = append(t.limits[cells[0]], limit{familyOf(cells[1]), f})
	return nil
}

// A limit is one figure of a second source, with its family.
type limit struct {
	family string
	figure figure
}

// far wants every shipped figure near to a published one of its family, doses,
// dose rates or concentrations: less than tenfold apart. A decimal point or a unit
// that slipped in either copy would part them.
func (t *Tables) far(d formulary.Drug) []Finding {
	families := map[string][]figure{}
	var out []Finding
	for _, e := range d.Entries() {
		family := familyOf(kindOf(e))
		f, err := parse(e.Text)
		if err != nil || family == "" {
			continue
		}
		if _, ok := families[family]; !ok {
			families[family] = t.family(d.Name, family)
		}
		near, comparable := false, false
		for _, p := range families[family] {
			if ratio, ok := f.over(p); ok {
				comparable = true
				near = near || ratio.Cmp(big.NewRat(10, 1)) < 0 && ratio.Cmp(big.NewRat(1, 10)) > 0
			}
		}
		if comparable && !near {
			out = append(out, Finding{"far", d.Name + ", " + e.Name + ", " + f.text, "published are " + texts(families[family])})
		}
	}
	return out
}

// familyOf is the family of a kind, "" for none.
func familyOf(kind string) string {
	family, _, _ := strings.Cut(kind, " ")
	if family == "total" {
		return "dose"
	}
	return family
}

// family is every published figure of a drug's family: those of second sources,
// the rows of the second copy, and strengths, which are concentrations.
func (t *Tables) family(drug, family string) []figure {
	var out []figure
	for _, l := range t.limits[drug] {
		if l.family == family {
			out = append(out, l.figure)
		}
	}
	for _, r := range t.rows[drug] {
		list := []figure{r.low, r.high}
		if family == "rate" {
			list = []figure{r.usualLow, r.usualHigh, r.hard}
		}
		for _, f := range list {
			if f.given() && family != "dose" {
				out = append(out, f)
			}
		}
	}
	for _, x := range t.doses[drug] {
		for _, f := range []figure{x.low, x.high, x.most} {
			if f.given() && family == "dose" {
				out = append(out, f)
			}
		}
	}
	for _, s := range t.strengths {
		if family == "concentration" && s.drug == drug && !s.powder {
			out = append(out, figure{s.amount.text + "/mL", s.amount.value, s.amount.kind, "mL"})
		}
	}
	return out
}

func texts(list []figure) string {
	var out []string
	for _, f := range list {
		if !slices.Contains(out, f.text) {
			out = append(out, f.text)
		}
	}
	return strings.Join(out, ", ")
}

// kindOf is the kind of the tables that an entry of a record belongs to, "" for
// none.
func kindOf(e formulary.Entry) string {
	group, item, _ := cutLast(e.Name)
	end := map[string]string{"lowest": "low", "highest": "high", "hard minimum": "low", "usual lowest": "low",
		"usual highest": "high", "soft maximum": "high", "hard maximum": "high",
		"highest first dose": "high", "highest repeat": "high"}[item]
	switch {
	case strings.HasPrefix(group, "local anaesthetic maximum"):
		return "total max"
	case strings.HasPrefix(group, "dose ") && slices.Contains([]string{"absolute maximum", "maximum of a day", "maximum of a course"}, item):
		return "total max"
	case end == "":
		return ""
	case strings.HasPrefix(group, "concentration for"):
		return "concentration " + end
	case strings.HasPrefix(group, "dose rate for"):
		return "rate " + end
	case strings.HasPrefix(group, "dose for"):
		return "dose " + end
	}
	return ""
}

// cutLast parts a name at its last colon.
func cutLast(name string) (group, item string, ok bool) {
	i := strings.LastIndex(name, ": ")
	if i < 0 {
		return name, "", false
	}
	return name[:i], name[i+2:], true
}
