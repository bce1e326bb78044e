package main

import (
	"fmt"
	"io"
	"path/filepath"
	"strings"

	"drawup/dilution"
	"drawup/dilution/order"
	"drawup/dilution/refusal"
	"drawup/dilution/tomlfile"
)

// takeShelf reads the shelf file that was named, and whether alternatives are to
// be kept.
func (f *paperFlags) takeShelf(lib *library) refusal.List {
	lib.bench.Explain = f.explain
	if !f.set.Changed("shelf") {
		return nil
	}
	data, faults := tomlfile.ReadFile(f.shelf)
	if faults.Refused() {
		return faults
	}
	shelf, faults := order.ReadShelf(filepath.ToSlash(f.shelf), data)
	lib.bench.Shelf, lib.shelf = &shelf, data
	return faults
}

// tellChoices says what was chosen for each syringe, why, and what else was
// weighed.
func tellChoices(w io.Writer, j *job) {
	for _, p := range j.list.Plans {
		fmt.Fprintf(w, "syringe %d, %s\n", p.Number, p.Name)
		for _, c := range p.Choices {
			tellChoice(w, c)
		}
		fmt.Fprintln(w)
	}
}

// tellChoice is one choice and what lost against it:
//
//	measuring syringe   2 mL
//	                    the smallest that has a line at 1.1 mL
//	  not 1 mL in steps of 0.01 mL: too small
func tellChoice(w io.Writer, c dilution.Choice) {
	const indent = 26
	blank := strings.Repeat(" ", indent)
	for i, l := range append(wrap(c.Took, widest-indent), wrap(c.Why, widest-indent)...) {
		head := blank
		if i == 0 {
			head = "  " + pad(c.What, indent-2)
		}
		fmt.Fprintf(w, "%s%s\n", head, oneLine(l))
	}
	for i := 0; i < len(c.Against); {
		names, end := alike(c.Against, i)
		why := c.Against[i].Why
		i = end
		for i, l := range wrap("not "+names+": "+why, widest-indent-2) {
			head := blank
			if i > 0 {
				head += "  "
			}
			fmt.Fprintf(w, "%s%s\n", head, oneLine(l))
		}
	}
}

// alike names the alternatives from i on that lost for the same reason, and says
// where they end.
func alike(list []dilution.Weighed, i int) (string, int) {
	end := i + 1
	names := []string{list[i].Option}
	for end < len(list) && list[end].Why == list[i].Why {
		names = append(names, list[end].Option)
		end++
	}
	if len(names) == 1 {
		return names[0], end
	}
	return strings.Join(names[:len(names)-1], ", ") + " or " + names[len(names)-1], end
}
