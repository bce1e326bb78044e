package published

import (
	"fmt"
	"math/big"
	"slices"
	"strings"

	"drawup/dilution/formulary"
)

// bounds finds concentrations that pass the loosest of the rows: those for
// infusions are held against the rows that have a dose rate, where there are any.
func (t *Tables) bounds(d formulary.Drug) []Finding {
	var out []Finding
	for _, e := range d.Entries() {
		kind := kindOf(e)
		f, err := parse(e.Text)
		if err != nil || !strings.HasPrefix(kind, "concentration") {
			continue
		}
		list := t.rows[d.Name]
		if strings.HasPrefix(e.Name, "concentration for infusion") && slices.ContainsFunc(list, row.infused) {
			list = slices.DeleteFunc(slices.Clone(list), func(r row) bool { return !r.infused() })
		}
		pick, passes := func(r row) figure { return r.high }, figure.above
		if kind == "concentration low" {
			pick, passes = func(r row) figure { return r.low }, figure.below
		}
		if loosest, ok := extreme(list, pick, kind == "concentration high"); ok && passes(f, loosest) {
			out = append(out, Finding{"looser", d.Name + ", " + e.Name + ", " + f.text, "the loosest of the rows is " + loosest.text})
		}
	}
	return out
}

// infused reports that the row gives a concentration with a dose rate.
func (r row) infused() bool { return r.infusion && r.high.given() }

// extreme is the highest or the lowest of the rows' figures; ok is false when
// they have none.
func extreme(list []row, pick func(row) figure, highest bool) (out figure, ok bool) {
	for _, r := range list {
		f := pick(r)
		if !f.given() {
			continue
		}
		if !ok || highest && f.above(out) || !highest && f.below(out) {
			out, ok = f, true
		}
	}
	return out, ok
}

// rates finds dose rates that pass the most cautious of the rows: the usual
// highest, and the highest figure of all, above which the planner refuses.
func (t *Tables) rates(d formulary.Drug) []Finding {
	hard, haveHard := extreme(t.rows[d.Name], func(r row) figure { return r.hard }, false)
	usual, haveUsual := extreme(t.rows[d.Name], func(r row) figure { return r.usualHigh }, false)
	var out []Finding
	passes := func(name string, f, limit figure) {
		out = append(out, Finding{"looser", d.Name + ", " + name + ", " + f.text, "the most cautious of the rows is " + limit.text})
	}
	for group, row := range rateRows(d) {
		over := haveUsual && row.usual.given() && row.usual.above(usual)
		if over {
			passes(group+": usual highest", row.usual, usual)
		}
		if haveHard && row.top.above(hard) && !(over && row.item == "usual highest") {
			passes(group+": "+row.item, row.top, hard)
		}
	}
	return out
}

// A rateRow is a row of dose rates of the record: its usual highest and its
// highest figure, with what that is.
type rateRow struct {
	usual, top figure
	item       string
}

func rateRows(d formulary.Drug) map[string]rateRow {
	out := map[string]rateRow{}
	for _, e := range d.Entries() { // in the order usual, soft, hard
		group, item, _ := cutLast(e.Name)
		f, err := parse(e.Text)
		if err != nil || kindOf(e) != "rate high" {
			continue
		}
		r := out[group]
		r.top, r.item = f, item
		if item == "usual highest" {
			r.usual = f
		}
		out[group] = r
	}
	return out
}

// times finds times in use that are longer than the most cautious of the rows for
// the fluid.
func (t *Tables) times(d formulary.Drug) []Finding {
	var out []Finding
	for _, s := range d.Stability {
		least, ok := t.hours(d.Name, s)
		have := figure{text: s.Text, value: big.NewRat(s.Minutes, 60), kind: "h"}
		if ok && (have.above(least) || least.value.Sign() == 0) {
			name := fmt.Sprintf("%s, %s, %s", d.Name, s.Name(), s.Text)
			out = append(out, Finding{"longer", name, "the most cautious of the rows is " + least.text})
		}
	}
	return out
}

// hours is the shortest time of the rows for a fluid and a place, "0 h" for at
// once; ok is false when no row has one.
func (t *Tables) hours(drug string, s formulary.Stability) (least figure, ok bool) {
	for _, r := range t.rows[drug] {
		hours := r.room
		if s.Storage == "refrigerator" {
			hours = r.fridge
		}
		fits := s.Diluent == "any" || s.Diluent == "neat" || len(r.diluents) == 0 || slices.Contains(r.diluents, s.Diluent)
		if hours == "" || !fits {
			continue
		}
		if h := rat(hours); !ok || h.Cmp(least.value) < 0 {
			least, ok = figure{text: hours + " h", value: h, kind: "h"}, true
		}
	}
	return least, ok
}
