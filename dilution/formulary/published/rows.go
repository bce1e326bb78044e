package published

import (
	"fmt"
	"math/big"
	"slices"
	"strings"

	"drawup/dilution/formulary"
)

// A row is one of the second copy: a container, or a concentration to
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
		code, _, _ := strings.Cut(d, " ") // "WFI (1 % only)"
		if fluids[code] == "" {
			return fmt.Errorf("got the fluid %q, which is not known", d)
		}
		r.diluents = append(r.diluents, fluids[code])
	}
	r.powder = strings.Contains(r.unit, "vial") || strings.Contains(r.unit, "powder")
	unit, _, _ := strings.Cut(r.unit, "_")
	if r.powder {
		unit = "mg"
	}
	if err := r.figures(cells, unit); err != nil {
		return err
	}
	if !r.high.given() && !r.powder && slices.Equal(r.diluents, []string{"neat"}) {
		r.low, r.high = r.strength, r.strength // used as it comes
	}
	t.rows[r.drug] = append(t.rows[r.drug], r)
	return nil
}

// figures reads the numbers of a row. Of a mixture, "2.5+0.5", concentrations are
// the first drug's. A rate in mL is of a fluid whose strength the row states.
func (r *row) figures(cells []string, unit string) error {
	first, second, _ := strings.Cut(cells[strengthColumn], "+")
	concentration, rate := cells[concentrationColumn], cells[rateColumn]
	fluid := strings.HasPrefix(rate, "mL/")
	if fluid {
		rate = strings.Replace(rate, "mL", "mg", 1)
	}
	for _, x := range []struct {
		into         *figure
		number, unit string
		fluid        bool
	}{
		{&r.strength, first, unit, false}, {&r.second, second, unit, false},
		{&r.low, cells[lowColumn], concentration, false}, {&r.high, cells[highColumn], concentration, false},
		{&r.usualLow, cells[usualLowColumn], rate, fluid}, {&r.usualHigh, cells[usualHighColumn], rate, fluid},
		{&r.hard, cells[hardColumn], rate, fluid},
	} {
		number, _, _ := strings.Cut(x.number, "+")
		if number == "" {
			continue
		}
		f, err := parse(number + " " + x.unit)
		if err != nil {
			return err
		}
		if x.fluid {
			f.value.Mul(f.value, r.strength.value)
		}
		*x.into = f
	}
	return nil
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
