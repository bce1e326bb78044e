package main

import (
	"fmt"
	"io"

	"drawup/dilution/order"
	"drawup/dilution/refusal"
	"drawup/labels"
)

// runLabel prints one label at the moment its syringe is filled: the time
// prepared is now, unless --at says otherwise (rule R18).
func runLabel(e env, args []string) int {
	f, faults := readPaperFlags("label", args)
	if f.help {
		return showHelp(e, "label")
	}
	doc := &planDocument{Syringes: []syringeJSON{}}
	if len(f.orders) != 1 && !faults.Refused() {
		faults = append(faults, refusal.Reason{
			Code: refusal.FlagMissing, Severity: refusal.Refuse,
			Field: "ORDER", Want: "one order file",
			Message: fmt.Sprintf("got %d order files, want one", len(f.orders)),
			Remedy:  "drawup label ORDER --syringe 3 --out label.pdf",
		})
	}
	if f.syringe < 1 && !faults.Refused() {
		faults = append(faults, refusal.Reason{
			Code: refusal.FlagMissing, Severity: refusal.Refuse,
			Field: "--syringe", Want: "the number of one syringe",
			Message: "--syringe does not say which label to print",
			Remedy:  "add --syringe and its number from the table of drawup prepare",
		})
	}
	if faults.Refused() {
		return finish(e, f.json, doc, nil, faults)
	}
	lib, faults := libraryOf(f.formulary)
	if faults.Refused() {
		return finish(e, f.json, doc, nil, faults)
	}
	if faults = f.takeShelf(&lib); faults.Refused() {
		return finish(e, f.json, doc, nil, faults)
	}
	j, all := newOneJob(f, lib, e)
	if all.Refused() {
		return finish(e, f.json, doc, nil, all)
	}
	return f.writeLabel(e, j, all)
}

// newOneJob plans the one syringe and leaves all others alone: their faults do
// not stop its label.
func newOneJob(f *paperFlags, lib library, e env) (*job, refusal.List) {
	probe, faults := readOrder(f.orders[0])
	if faults.Refused() && len(probe.Syringes) == 0 {
		return nil, faults
	}
	if f.syringe > len(probe.Syringes) {
		return nil, refusal.List{{
			Code: refusal.SyringeNumber, Severity: refusal.Refuse,
			Field: "--syringe", Got: fmt.Sprint(f.syringe),
			Want:    fmt.Sprintf("a number from 1 to %d", len(probe.Syringes)),
			Message: fmt.Sprintf("the order has no syringe %d", f.syringe),
			Remedy:  "take the number from the table of drawup prepare",
		}}
	}
	others := map[int]bool{}
	for _, s := range probe.Syringes {
		if s.Number != f.syringe {
			others[s.Number] = true
		}
	}
	return newJob(f.orders[0], lib, f.when(e.now), others, silent)
}

// writeLabel places the one label and writes it.
func (f *paperFlags) writeLabel(e env, j *job, all refusal.List) int {
	doc := planOf(j)
	doc.LeftOut, all = nil, without(all, refusal.SyringesLeftOut) // the others are left alone, not left out
	l, p := j.labels[0], j.list.Plans[0]
	stock := f.stock
	switch {
	case stock == "" && p.Infusion != nil:
		stock = "roll-70x37"
	case stock == "":
		stock = "roll-40x15"
	}
	j.list.LeftOut = nil
	pages, reasons := placeLabels(j, []labels.Label{l}, stock, 0, f.mono)
	all = append(all, reasons...)
	if f.out == "" {
		f.out = fmt.Sprintf("label-%d.pdf", f.syringe)
	}
	if !all.Refused() {
		data, reasons := pdfOf(pages, "Syringe label", j)
		if all = append(all, reasons...); !all.Refused() {
			all = append(all, writeAll([]file{{f.out, data}}, f.inputs())...)
		}
	}
	return finish(e, f.json, doc, func(w io.Writer) {
		fmt.Fprintf(w, "%s\nwrote %s\n", labelWords(l), f.out)
	}, all)
}

// labelWords is what the label says, in one line, for reading aloud.
func labelWords(l labels.Label) string {
	s := l.Name
	if l.Second != "" {
		s += " with " + l.Second
	}
	return fmt.Sprintf("%s %s, %s, %s", s, l.Concentration.Text, l.Amount.Text(), l.UseBy.Text())
}

// readOrder reads an order file for its list of syringes.
func readOrder(path string) (order.Order, refusal.List) {
	data, faults := readFile(path)
	if faults.Refused() {
		return order.Order{}, faults
	}
	return order.Read(path, data)
}

// without is l less the reasons of one code.
func without(l refusal.List, code refusal.Code) refusal.List {
	var out refusal.List
	for _, r := range l {
		if r.Code != code {
			out = append(out, r)
		}
	}
	return out
}
