package main

import (
	"fmt"
	"strings"

	"drawup/dilution/recheck"
	"drawup/dilution/refusal"
	"drawup/labels"
	"drawup/layouts"
	"drawup/layouts/ink"
)

// A labelPart is the labels of one file: runs on their stocks.
type labelPart struct{ runs []labelRun }

// A labelRun is labels that go on one stock; used of the first sheet are gone.
type labelRun struct {
	list  []labels.Label
	stock string
	used  int
}

// pages places the runs of a part one after the other.
func (p labelPart) pages(j *job, mono bool) ([]ink.Page, refusal.List) {
	var pages []ink.Page
	var all refusal.List
	for _, r := range p.runs {
		more, reasons := placeLabels(j, r.list, r.stock, r.used, mono)
		pages, all = append(pages, more...), append(all, reasons...)
	}
	return pages, all
}

// partName is labels.pdf, or labels-1.pdf and so on when the job is cut.
func partName(i, parts int) string {
	if parts == 1 {
		return "labels.pdf"
	}
	return fmt.Sprintf("labels-%d.pdf", i+1)
}

// labelParts sorts bolus labels on one stock and infusion labels on another. A
// bolus label that its stock cannot hold goes to the larger one, and a caution
// says so: nothing on it is cut, shrunk or dropped (rule R15). Beyond
// layouts.PartSize labels the job is cut into several files, so that memory
// stops growing.
func (f *paperFlags) labelParts(j *job) ([]labelPart, refusal.List) {
	stock := f.stock
	if stock == "" {
		stock = "a4-65"
	}
	var small, large []labels.Label
	var reasons refusal.List
	for i, p := range j.list.Plans {
		l := j.labels[i]
		switch {
		case p.Infusion != nil:
			large = append(large, l)
		case stock != f.infusionStock && tooSmall(j, l, stock, f.mono):
			large = append(large, l)
			reasons = append(reasons, movedCaution(l, stock, f.infusionStock))
		default:
			small = append(small, l)
		}
	}
	reasons = append(reasons, together(len(j.labels))...)
	var parts []labelPart
	for _, group := range []labelRun{{small, stock, f.used}, {large, f.infusionStock, 0}} {
		for _, run := range group.cut() {
			if n := len(parts); n > 0 && len(j.labels) <= layouts.PartSize {
				parts[n-1].runs = append(parts[n-1].runs, run)
			} else {
				parts = append(parts, labelPart{[]labelRun{run}})
			}
		}
	}
	return parts, reasons
}

// cut is the run in parts that one file may hold. A stock that does not exist
// stays whole: placing it refuses.
func (r labelRun) cut() []labelRun {
	if len(r.list) == 0 {
		return nil
	}
	s, ok := layouts.StockNamed(r.stock)
	if !ok {
		return []labelRun{r}
	}
	var out []labelRun
	for i, list := range layouts.Parts(r.list, s, r.used, layouts.PartSize) {
		run := labelRun{list: list, stock: r.stock}
		if i == 0 {
			run.used = r.used
		}
		out = append(out, run)
	}
	return out
}

// together is the caution that goes with every list of labels: the rule is to
// label a syringe when it is filled, before it leaves the hand (NPSA 2007 and
// EBA, as quoted in Anaesthesia News, February 2021).
func together(n int) refusal.List {
	if n < 2 {
		return nil
	}
	return refusal.List{{
		Code: refusal.LabelsTogether, Severity: refusal.Caution,
		Field: "labels", Got: fmt.Sprintf("%d labels at once", n),
		Want:   "one label when its syringe is filled",
		Source: "NPSA 2007 and European Board of Anaesthesiology, quoted in Anaesthesia News, February 2021",
		Message: "labels lie ready before the syringes are filled; label each syringe after filling, before it " +
			"leaves the hand, and finish one drug before the next",
		Remedy: "drawup label ORDER --syringe N prints one label at its moment",
	}}
}

// tooSmall reports that the stock cannot hold the label, and that alone.
func tooSmall(j *job, l labels.Label, stock string, mono bool) bool {
	_, reasons := placeLabels(j, []labels.Label{l}, stock, 0, mono)
	codes := reasons.Refusals().Codes()
	return len(codes) == 1 && codes[0] == refusal.LabelTooSmall
}

func movedCaution(l labels.Label, from, to string) refusal.Reason {
	return refusal.Reason{
		Code: refusal.LabelMoved, Severity: refusal.Caution,
		Syringe: l.Number, Field: "--stock",
		Got: from, Want: to,
		Rule: "R15",
		Message: fmt.Sprintf("the label of syringe %d, %s, does not fit %s and stands on the sheet of %s",
			l.Number, l.Name, from, to),
		Remedy: "load that sheet for it",
	}
}

// placeLabels puts labels on a named stock.
func placeLabels(j *job, list []labels.Label, name string, used int, mono bool) ([]ink.Page, refusal.List) {
	if len(list) == 0 {
		return nil, nil
	}
	s, ok := layouts.StockNamed(name)
	if !ok {
		return nil, refusal.List{{
			Code: refusal.StockUnknown, Severity: refusal.Refuse,
			Field: "--stock", Got: name,
			Want: stockNames(), Rule: "R15",
			Message: fmt.Sprintf("there is no stock of labels called %q", name),
			Remedy:  "use one of: " + stockNames(),
		}}
	}
	passed := make([]recheck.Passed, len(list))
	for i, l := range list {
		passed[i] = j.passed[l.Number]
	}
	return layouts.Labels(list, s, passed, layouts.Options{Used: used, Mono: mono, Foot: j.foot()})
}

func stockNames() string {
	var names []string
	for _, s := range layouts.Stocks() {
		names = append(names, s.Name)
	}
	return strings.Join(names, ", ")
}
