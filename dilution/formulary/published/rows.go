package published

import (
	"fmt"
	"math/big"
	"slices"
	"strings"

	"drawup/dilution/formulary"
)

// A row is one of the second transcription: a container, or a concentration to
// prepare.
type row struct {
	drug, purpose, unit, volume string
	prepared                    bool
	strength, second            figure // per mL, or of a powder per container
	powder                      bool
	diluents                    []string
	low, high                   figure // concentrations
	usualLow, usualHigh, hard   figure // dose rates
	room, fridge                string // hours
	infusion                    bool
	sources                     string
}

// The columns of a row.
const (
	drugColumn = iota
	innColumn
	classColumn
	strengthColumn
	unitColumn
	volumeColumn
	diluentColumn
	lowColumn
	highColumn
	concentrationColumn
	rateColumn
	usualLowColumn
	usualHighColumn
	hardColumn
	roomColumn
	fridgeColumn
	sourceColumn
	noteColumn
	columns
)

func (t *Tables) readRow(cells []string) error {
	if len(cells) != columns || cells[sourceColumn] == "" {
		return fmt.Errorf("got %d cells, want %d with sources", len(cells), columns)
	}
	r := row{drug: cells[drugColumn], purpose: cells[innColumn], volume: cells[volumeColumn], unit: cells[unitColumn],
		prepared: strings.HasPrefix(cells[noteColumn], "prepared"), room: cells[roomColumn], fridge: cells[fridgeColumn],
		infusion: cells[rateColumn] != "", sources: cells[sourceColumn] + " " + cells[noteColumn]}
	for d := range strings.FieldsFuncSeq(cells[diluentColumn], func(c rune) bool { return c == ';' || c == ',' }) {
		r.diluents = append(r.diluents, fluids[strings.Fields(d)[0]])
	}
	r.powder = strings.Contains(r.unit, "vial") || strings.Contains(r.unit, "powder")
	unit := r.unit
	if r.powder {
		unit = "mg"
	}
	var err error
	read := func(into *figure, number, unit string) {
		number, _, _ = strings.Cut(number, "+") // of a mixture, the first drug
		if number != "" && err == nil {
			*into, err = parse(number + " " + unit)
		}
	}
	read(&r.strength, cells[strengthColumn], unit)
	if _, second, mixed := strings.Cut(cells[strengthColumn], "+"); mixed {
		read(&r.second, second, unit)
	}
	read(&r.low, cells[lowColumn], cells[concentrationColumn])
	read(&r.high, cells[highColumn], cells[concentrationColumn])
	rate, number := cells[rateColumn], func(s string) string { return s }
	if strings.HasPrefix(rate, "mL/") { // of a fluid of known strength
		rate = strings.Replace(rate, "mL", "mg", 1)
		number = func(s string) string {
			if s == "" {
				return ""
			}
			return new(big.Rat).Mul(rat(s), rat(cells[strengthColumn])).RatString()
		}
	}
	read(&r.usualLow, number(cells[usualLowColumn]), rate)
	read(&r.usualHigh, number(cells[usualHighColumn]), rate)
	read(&r.hard, number(cells[hardColumn]), rate)
	if !r.high.given() && !r.powder && slices.Equal(r.diluents, []string{"neat"}) {
		r.low, r.high = r.strength, r.strength // used as it comes
	}
	t.rows[r.drug] = append(t.rows[r.drug], r)
	return err
}

// fluids are the names of the formulary for the codes of the rows.
var fluids = map[string]string{
	"NS": "sodium chloride 0.9 %", "HS": "sodium chloride 0.45 %", "G5": "glucose 5 %", "G10": "glucose 10 %",
	"GNS": "glucose 5 % with sodium chloride 0.9 %", "G5NS": "glucose 5 % with sodium chloride 0.9 %",
	"NS+G5": "glucose 5 % with sodium chloride 0.9 %", "HS+G5": "glucose 5 % with sodium chloride 0.45 %",
	"HNS": "sodium chloride 0.45 %", "G4S": "glucose 4 % with sodium chloride 0.18 %", "R": "Ringer's solution",
	"LR": "compound sodium lactate", "RL": "compound sodium lactate", "CSL": "compound sodium lactate",
	"WFI": "water for injections", "BWFI": "bacteriostatic water for injections", "LAC": "sodium lactate 1/6 molar",
	"M10": "mannitol 10 %", "NEAT": "neat", "none": "neat", "NONE": "neat",
}

// container is the row in words: "10 mg/mL, 20 mL".
func (r row) container() string {
	out := r.strength.text
	if r.second.given() {
		out += " with " + r.second.text
	}
	if r.powder {
		out += " of powder"
	}
	if r.volume != "" {
		out += ", " + r.volume + " mL"
	}
	return out
}

// is reports that the row is this container. Fluid to add and volume obtained
// differ by the powder itself, so a powder is known by its amount alone.
func (r row) is(p formulary.Presentation) bool {
	volume := r.volume
	if r.powder {
		volume = ""
	}
	if !holds(p, r.powder, r.strength, volume) || (r.second.given()) != (p.SecondName != "") {
		return false
	}
	if !r.second.given() {
		return true
	}
	second, err := parse(p.SecondAmount.Written())
	_, v, err2 := contents(p)
	return err == nil && err2 == nil && new(big.Rat).Quo(second.value, v).Cmp(r.second.value) == 0
}

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
		if infusions := slices.DeleteFunc(slices.Clone(list), func(r row) bool { return !r.infusion || !r.high.given() }); strings.HasPrefix(e.Name, "concentration for infusion") && len(infusions) > 0 {
			list = infusions
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
		if haveUsual && row.usual.given() && row.usual.above(usual) {
			passes(group+": usual highest", row.usual, usual)
		}
		if haveHard && row.top.above(hard) {
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

// times finds times in use that are longer than the longest of the rows for the
// fluid.
func (t *Tables) times(d formulary.Drug) []Finding {
	var out []Finding
	for _, s := range d.Stability {
		var most *big.Rat
		for _, r := range t.rows[d.Name] {
			hours := r.room
			if s.Storage == "refrigerator" {
				hours = r.fridge
			}
			fits := s.Diluent == "any" || s.Diluent == "neat" || len(r.diluents) == 0 || slices.Contains(r.diluents, s.Diluent)
			if hours == "" || !fits {
				continue
			}
			if h := rat(hours); most == nil || h.Cmp(most) > 0 {
				most = h
			}
		}
		if have := big.NewRat(s.Minutes, 60); most != nil && have.Cmp(most) > 0 {
			name := fmt.Sprintf("%s, stability, %s, %s, %s", d.Name, s.Diluent, s.Storage, s.Text)
			out = append(out, Finding{"longer", name, "the longest of the rows is " + most.RatString() + " h"})
		}
	}
	return out
}
