package published

import (
	"fmt"

	"drawup/dilution/formulary"
)

// A dose is one row of the second copy of doses.
type dose struct {
	low, high figure // of one dose
	most      figure // in one dose, a day or a course
}

func (t *Tables) readDose(cells []string) error {
	if len(cells) != 7 || cells[6] == "" {
		return fmt.Errorf("got %d cells, want 7, the last with a source", len(cells))
	}
	var d dose
	for _, x := range []struct {
		into *figure
		text string
	}{{&d.low, join(cells[2], cells[4])}, {&d.high, join(cells[3], cells[4])}, {&d.most, cells[5]}} {
		if x.text == "" {
			continue
		}
		f, err := parse(x.text)
		if err != nil {
			return err
		}
		*x.into = f
	}
	t.doses[cells[0]] = append(t.doses[cells[0]], d)
	return nil
}

// join is a number with its unit, "" without a number.
func join(number, unit string) string {
	if number == "" {
		return ""
	}
	return number + " " + unit
}

// highest finds doses and maxima that pass the loosest of the transcribed doses
// that are counted the same way.
func (t *Tables) highest(d formulary.Drug) []Finding {
	var out []Finding
	for _, e := range d.Entries() {
		kind := kindOf(e)
		f, err := parse(e.Text)
		if err != nil || kind != "dose high" && kind != "total max" {
			continue
		}
		var loosest figure
		for _, x := range t.doses[d.Name] {
			for _, y := range []figure{x.high, x.most} {
				if y.given() && y.per == f.per && y.kind == f.kind && (!loosest.given() || y.above(loosest)) {
					loosest = y
				}
			}
		}
		if loosest.given() && f.above(loosest) {
			out = append(out, Finding{"looser", d.Name + ", " + e.Name + ", " + f.text, "the loosest of the transcribed doses is " + loosest.text})
		}
	}
	return out
}
