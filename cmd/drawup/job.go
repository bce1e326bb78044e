package main

import (
	"crypto/sha256"
	"encoding/binary"
	"encoding/hex"
	"fmt"
	"path/filepath"
	"strings"
	"time"

	"drawup/dilution"
	"drawup/dilution/formulary"
	"drawup/dilution/order"
	"drawup/dilution/recheck"
	"drawup/dilution/refusal"
	"drawup/dilution/tomlfile"
	"drawup/labels"
	"drawup/labels/sheets"
)

// A job is one order on its way to paper: read, planned, worded, and passed by
// the second route.
type job struct {
	file   string // as typed
	tell   progress
	order  order.Order
	shelf  *order.Shelf // nil without one
	list   dilution.List
	facts  []labels.Facts
	labels []labels.Label
	making labels.Making
	drawUp []sheets.Sheet
	pumps  []sheets.Sheet
	checks []sheets.Sheet
	passed map[int]recheck.Passed // by syringe number
}

// newJob reads and plans the order in file. at, when given, overrides the time
// prepared; the list of reasons holds everything that is wrong.
func newJob(
	file string,
	lib library,
	at func(order.Session) (time.Time, refusal.List),
	leaveOut map[int]bool,
	tell progress,
) (*job, refusal.List) {
	data, faults := readFile(file)
	if faults.Refused() {
		return nil, faults
	}
	o, faults := order.Read(file, data)
	when, late := at(o.Session)
	faults = append(faults, late...)
	f, lapsed := lib.at(when)
	faults = append(faults, lapsed...)
	faults = append(faults, unknownNumbers(o, leaveOut)...)
	products, wrong := productsOf(o, f)
	faults = append(faults, wrong...)
	j := &job{file: file, order: o, tell: tell}
	list, reasons := lib.bench.NewList(o, f, when, leaveOut, faults)
	j.list = list
	if reasons.Refused() {
		reasons.Sort()
		return j, reasons
	}
	if len(lib.shelf) > 0 { // another shelf is another plan (rule R19)
		data = fmt.Appendf(nil, "%s\nshelf, %d bytes\n%s", data, len(lib.shelf), lib.shelf)
	}
	j.shelf = lib.bench.Shelf
	j.making = makingOf(o, f, when, data, leaveOut)
	j.making.Products = products
	reasons = append(reasons, leftOut(list)...)
	return j, append(reasons, j.word()...)
}

// leftOut is the caution that names what was left out on request.
func leftOut(l dilution.List) refusal.List {
	if len(l.LeftOut) == 0 {
		return nil
	}
	var words []string
	for _, x := range l.LeftOut {
		words = append(words, fmt.Sprintf("%d (%s)", x.Number, x.Drug))
	}
	return refusal.List{{
		Code: refusal.SyringesLeftOut, Severity: refusal.Caution,
		Field: "--leave-out", Got: strings.Join(words, ", "),
		Message: "left out on request: syringe " + strings.Join(words, ", "),
		Remedy:  "make these another way, or mend the order",
	}}
}

// unknownNumbers refuses numbers to leave out that no syringe has.
func unknownNumbers(o order.Order, leaveOut map[int]bool) refusal.List {
	var out refusal.List
	for n := range leaveOut {
		if n < 1 || n > len(o.Syringes) {
			out = append(out, refusal.Reason{
				Code: refusal.SyringeNumber, Severity: refusal.Refuse,
				Field: "--leave-out", Got: fmt.Sprint(n),
				Want:    fmt.Sprintf("a number from 1 to %d", len(o.Syringes)),
				Message: fmt.Sprintf("the order has no syringe %d", n),
				Remedy:  "check the number in the table or the refusal",
			})
		}
	}
	return out
}

// makingOf is what all papers of the run share. The digest binds the order's
// bytes, the formulary and the time (rule R19).
func makingOf(
	o order.Order, f *formulary.Formulary, at time.Time, data []byte, leaveOut map[int]bool,
) labels.Making {
	sum := sha256.New()
	fmt.Fprintf(sum, "%s\n%s\n%d\n", f.Digest, at.Format(time.RFC3339), len(data))
	sum.Write(data)
	for n := range o.Syringes {
		if leaveOut[n+1] {
			fmt.Fprintf(sum, "\nwithout %d", n+1)
		}
	}
	digest := sum.Sum(nil)
	// Without the time: a label printed at its moment keeps its serial.
	order := sha256.Sum256(append([]byte(f.Digest+"\n"), data...))
	style := styleOf(o)
	return labels.Making{
		Place: o.Session.Place.Value, Preparer: o.Session.Preparer.Value, Made: labels.Moment(style, at),
		Formulary: f.Name + " " + f.Version, FormularyDigest: f.Digest[:12], State: f.State(), Approved: f.Approved(),
		Digest:   hex.EncodeToString(digest)[:8],
		Serial:   fmt.Sprintf("%05d", binary.BigEndian.Uint32(order[:])%100000),
		Invented: o.Session.Invented,
	}
}

// word writes labels and sheets and sends every figure through the second
// route. A disagreement is a fault of this program and stops everything.
func (j *job) word() refusal.List {
	for i, p := range j.list.Plans {
		j.tell("wording", i+1, len(j.list.Plans))
		facts := labels.FactsOf(p)
		l, err := labels.FromPlan(p, facts, j.making)
		if err != nil {
			return refusal.List{ourFault(p.Number, err)}
		}
		j.facts, j.labels = append(j.facts, facts), append(j.labels, l)
	}
	j.drawUp = sheets.DrawUp(j.list, j.facts, j.making)
	j.pumps = sheets.PumpCards(j.list, j.facts, j.making)
	j.checks = sheets.CheckSheets(j.list, j.facts, j.making)
	return j.check()
}

// check is the second route over every figure of every paper (rule R17).
func (j *job) check() refusal.List {
	j.passed = map[int]recheck.Passed{}
	var out refusal.List
	for i, p := range j.list.Plans {
		j.tell("working again", i+1, len(j.list.Plans))
		figures := j.figuresOf(i)
		passed, err := recheck.Check(j.stated(i, figures, figures))
		if err != nil {
			out = append(out, ourFault(p.Number, err))
			continue
		}
		j.passed[p.Number] = passed
	}
	return out
}

// figuresOf is every figure of every paper of the i-th syringe.
func (j *job) figuresOf(i int) []recheck.Figure {
	figures := j.labels[i].Figures("label")
	for _, s := range j.allSheets() {
		figures = append(figures, s.FiguresOf(j.list.Plans[i].Number)...)
	}
	return figures
}

// stated is what the second route gets for the i-th syringe: the figures as
// they stand on paper, and beside what was typed the sentences and limits as
// the papers were given them.
func (j *job) stated(i int, printed, given []recheck.Figure) recheck.Stated {
	s := labels.Stated(j.list.Plans[i], printed)
	s.Asked = append(s.Asked, j.making.Asked(j.list.Plans[i])...)
	for _, f := range given {
		if strings.HasPrefix(f.Name, recheck.Said+".") || strings.HasPrefix(f.Name, recheck.Bound+".") {
			s.Asked = append(s.Asked, recheck.Figure{Paper: f.Paper, Name: f.Name, Text: f.Text})
		}
	}
	return s
}

func (j *job) allSheets() []sheets.Sheet {
	var all []sheets.Sheet
	return append(append(append(all, j.drawUp...), j.pumps...), j.checks...)
}

// ourFault is a fault of the program, not of the order: exit code 3.
func ourFault(syringe int, err error) refusal.Reason {
	return refusal.Reason{
		Code: refusal.RoutesDisagree, Severity: refusal.Refuse,
		Syringe: syringe, Rule: "R17",
		Message: "the two routes disagree: " + err.Error(),
		Remedy:  "do not use any figure of this order; report the order and this message",
	}
}

// subject is what a file says of itself: the state of the formulary, and which
// edition of the standard its labels follow.
func (j *job) subject() string {
	if len(j.labels) == 0 {
		return j.making.State
	}
	return j.making.State + "; labels: " + j.labels[0].Class.Claim()
}

// name is the order's file name without its folder and ending.
func (j *job) name() string { return nameOf(j.file) }

func nameOf(path string) string {
	base := filepath.Base(path)
	return strings.TrimSuffix(base, filepath.Ext(base))
}

// readFile reads an order file whole, or says why not.
func readFile(path string) ([]byte, refusal.List) { return tomlfile.ReadFile(path) }
