package published

import (
	"fmt"
	"math/big"
	"slices"
	"strings"

	"drawup/dilution/formulary"
)

// A limit is one row of the tables of second sources.
type limit struct {
	figure figure
	source string
}

func (t *Tables) readLimit(cells []string) error {
	if len(cells) != 4 || cells[3] == "" {
		return fmt.Errorf("got %d cells, want 4, the last with a source", len(cells))
	}
	f, err := parse(cells[2])
	if err != nil {
		return err
	}
	key := cells[0] + "|" + cells[1]
	t.limits[key] = append(t.limits[key], limit{f, cells[3]})
	return nil
}

// kinds are those of the tables of second sources.
var kinds = []string{"concentration low", "concentration high", "rate low", "rate high", "dose low", "dose high", "total max"}

// far wants a shipped figure of each kind near to a published one: less than ten
// times looser, and not a hundred times more cautious. A decimal point or a unit
// that slipped in either copy would part them.
func (t *Tables) far(d formulary.Drug) []Finding {
	shipped := map[string][]figure{}
	for _, e := range d.Entries() {
		kind := kindOf(e)
		if f, err := parse(e.Text); err == nil && kind != "" {
			shipped[kind] = append(shipped[kind], f)
		}
	}
	var out []Finding
	for _, kind := range kinds {
		list := t.limits[d.Name+"|"+kind]
		if len(list) == 0 || len(shipped[kind]) == 0 {
			continue
		}
		if !slices.ContainsFunc(shipped[kind], func(f figure) bool {
			return slices.ContainsFunc(list, func(l limit) bool { return l.near(f, strings.HasSuffix(kind, "low")) })
		}) {
			out = append(out, Finding{"far", d.Name + ", " + kind, texts(shipped[kind]) + " is shipped, " + published(list) + " is published"})
		}
	}
	return out
}

// near reports that a shipped figure is less than ten times looser than the
// published one, and not a hundred times more cautious. Of two lower ends the
// higher is the cautious one.
func (l limit) near(f figure, lower bool) bool {
	ratio, ok := f.over(l.figure)
	if !ok {
		return false
	}
	if lower {
		ratio.Inv(ratio)
	}
	return ratio.Cmp(big.NewRat(10, 1)) < 0 && ratio.Cmp(big.NewRat(1, 100)) > 0
}

func texts(list []figure) string {
	var out []string
	for _, f := range list {
		out = append(out, f.text)
	}
	return strings.Join(out, ", ")
}

func published(list []limit) string {
	var out []string
	for _, l := range list {
		out = append(out, l.figure.text+" ("+l.source+")")
	}
	return strings.Join(out, ", ")
}

// kindOf is the kind of the tables that an entry of a record belongs to, "" for
// none.
func kindOf(e formulary.Entry) string {
	group, item, _ := cutLast(e.Name)
	end := map[string]string{"lowest": "low", "highest": "high", "hard minimum": "low", "usual lowest": "low",
		"usual highest": "high", "soft maximum": "high", "hard maximum": "high"}[item]
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
