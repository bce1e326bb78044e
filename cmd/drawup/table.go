package main

import (
	"fmt"
	"io"
	"path/filepath"
	"strings"
	"unicode/utf8"

	"drawup/dilution"
	"drawup/dilution/quantity/lint"
	"drawup/dilution/recheck"
	"drawup/dilution/refusal"
	"drawup/labels"
)

// widest is the widest line that the table may have, in characters.
const widest = 100

// columns of the table of syringes, with their widths. They add up, with the
// blanks between them, to at most widest.
var columns = []struct {
	head  string
	width int
}{{"no", 2}, {"patient", 8}, {"drug", 22}, {"draw", 8}, {"to", 6}, {"holds", 26}, {"dose or start", 19}}

// table writes the syringes to make, in order.
func table(w io.Writer, j *job) {
	fmt.Fprintf(w, "%s, %s, prepared %s by %s\n", j.name(), j.making.Place, j.making.Made, j.making.Preparer)
	fmt.Fprintf(w, "%s: %s\n\n", j.making.Formulary, j.making.State)
	var heads []string
	for _, c := range columns {
		heads = append(heads, c.head)
	}
	row(w, heads)
	for i, p := range j.list.Plans {
		row(w, cellsOf(p, j.facts[i]))
	}
	for _, l := range j.list.LeftOut {
		fmt.Fprintf(w, "%2d  left out: %s\n", l.Number, l.Drug)
	}
	fmt.Fprintln(w)
}

// cellsOf is one row: what is drawn, up to what, what the syringe then holds,
// and what one dose or the start rate is.
func cellsOf(p dilution.Plan, f labels.Facts) []string {
	to := "neat"
	if p.Mixture.DiluentVolume.Given() {
		to = f.Text(recheck.FinalVolume)
	}
	last := ""
	switch {
	case p.Infusion != nil:
		last = "start " + f.Text(recheck.StartRate)
	case p.Dose != nil && p.Dose.Volume.Cmp(p.Mixture.FinalVolume) == 0:
		last = "one dose"
	case p.Dose != nil:
		last = "dose " + f.Text(recheck.DoseVolume)
	}
	holds := f.Text(recheck.AmountInSyringe) + ", " + f.Text(recheck.Concentration)
	return []string{
		fmt.Sprint(p.Number), p.Patient.ID.Value, p.Name,
		f.Text(recheck.DrugVolume), to, holds, last,
	}
}

// row writes the cells in their columns. A text wider than its column, or a
// figure, is never cut: the row goes on in the next line.
func row(w io.Writer, cells []string) {
	var b strings.Builder
	indent := 0
	for i, c := range cells {
		width := columns[i].width
		if i == 0 {
			c = padLeft(c, width)
		}
		b.WriteString(c)
		if utf8.RuneCountInString(c) > width && i < len(cells)-1 {
			b.WriteString("\n" + strings.Repeat(" ", indent+width+2))
		} else if i < len(cells)-1 {
			b.WriteString(strings.Repeat(" ", width-utf8.RuneCountInString(c)+2))
		}
		indent += width + 2
	}
	for _, line := range strings.Split(b.String(), "\n") {
		fmt.Fprintln(w, strings.TrimRight(line, " "))
	}
}

// tellFiles names what was written.
func tellFiles(w io.Writer, files []file) {
	for _, f := range files {
		fmt.Fprintf(w, "wrote %s\n", filepath.ToSlash(f.path))
	}
}

// tellCautions counts the cautions and says where they stand; those that
// concern the whole list are written out.
func tellCautions(w io.Writer, l refusal.List) {
	if len(l) == 0 {
		return
	}
	fmt.Fprintln(w)
	count := "1 caution stands"
	if len(l) > 1 {
		count = fmt.Sprintf("%d cautions stand", len(l))
	}
	fmt.Fprintf(w, "%s on the draw-up sheet; of these, before you start:\n", count)
	for _, r := range l {
		if r.Syringe == 0 || r.Code == refusal.LabelMoved {
			for _, line := range wrap(string(r.Code)+": "+r.Message, widest-2) {
				fmt.Fprintf(w, "  %s\n", line)
			}
		}
	}
}

// wrap breaks text at blanks into lines of at most width characters, never
// between a number and its unit (rule N26) or inside a number.
func wrap(text string, width int) []string {
	var lines []string
	line := ""
	for _, word := range unparted(text) {
		switch {
		case line == "":
			line = word
		case utf8.RuneCountInString(line)+1+utf8.RuneCountInString(word) <= width:
			line += " " + word
		default:
			lines = append(lines, line)
			line = word
		}
	}
	return append(lines, line)
}

// unparted are the pieces of a text between which a line may end.
func unparted(text string) []string {
	var out []string
	for _, word := range strings.Split(text, " ") {
		n := len(out)
		switch {
		case word == "":
		case n > 0 && lint.Tied(out[n-1], strings.TrimRight(word, "\"',;:)")):
			out[n-1] += " " + word
		default:
			out = append(out, word)
		}
	}
	return out
}
