package main

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"time"

	"github.com/spf13/pflag"

	"drawup/dilution/order"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/labels"
	"drawup/layouts"
	"drawup/layouts/ink"
)

// paperFlags are the flags that prepare and label share.
type paperFlags struct {
	set           *pflag.FlagSet
	out           string
	at            string
	stock         string
	infusionStock string
	used          int
	mono          bool
	json, help    bool
	leaveOut      []string
	syringe       int
	formulary     formularyFlags
	shelf         string
	explain       bool
	orders        []string
}

// asError is errors.As.
func asError(err error, target any) bool { return errors.As(err, target) }

// readPaperFlags reads the flags of a command that prints.
func readPaperFlags(name string, args []string) (*paperFlags, refusal.List) {
	f := &paperFlags{set: pflag.NewFlagSet(name, pflag.ContinueOnError)}
	f.set.SetOutput(io.Discard)
	f.set.Usage = func() {}
	f.set.StringVar(&f.at, "at", "", "time prepared")
	f.set.StringVar(&f.stock, "stock", "", "stock of blank labels")
	f.set.StringSliceVar(&f.formulary.files, "formulary", nil, "the site's own formulary files")
	f.set.StringVar(&f.formulary.approval, "approval", "", "who signed for the formulary")
	f.set.StringVar(&f.shelf, "shelf", "", "what there is to make them from")
	f.set.BoolVar(&f.mono, "mono", false, "black and white printer")
	f.set.BoolVar(&f.json, "json", false, "")
	f.set.BoolVarP(&f.help, "help", "h", false, "")
	switch name {
	case "prepare":
		f.set.StringVar(&f.out, "out", ".", "folder to write to")
		f.set.StringVar(&f.infusionStock, "infusion-stock", "a4-24", "stock for infusion labels")
		f.set.IntVar(&f.used, "labels-used", 0, "labels already taken from the first sheet")
		f.set.StringSliceVar(&f.leaveOut, "leave-out", nil, "syringe numbers to leave out")
		f.set.BoolVar(&f.explain, "explain", false, "what else was weighed")
	case "label":
		f.set.StringVar(&f.out, "out", "", "file to write")
		f.set.IntVar(&f.syringe, "syringe", 0, "number of the syringe")
	}
	if err := f.set.Parse(args); err != nil {
		f.json = f.json || wantsJSON(args)
		var names []string
		f.set.VisitAll(func(x *pflag.Flag) { names = append(names, x.Name) })
		return f, refusal.List{flagFault(err, names)}
	}
	f.orders = f.set.Args()
	return f, nil
}

// runPrepare plans orders and writes all papers of each, or none of any.
func runPrepare(e env, args []string) int {
	f, faults := readPaperFlags("prepare", args)
	if f.help {
		return showHelp(e, "prepare")
	}
	doc := &planDocument{Syringes: []syringeJSON{}}
	leaveOut, bad := f.numbers()
	faults = append(faults, bad...)
	if len(f.orders) == 0 && !faults.Refused() {
		faults = append(faults, refusal.Reason{
			Code: refusal.FlagMissing, Severity: refusal.Refuse,
			Field: "ORDER", Want: "an order file",
			Message: "no order file is named",
			Remedy:  "drawup prepare testdata/orders/harbour-morning.toml --out out",
		})
	}
	if len(f.orders) > 1 && len(leaveOut) > 0 {
		faults = append(faults, refusal.Reason{
			Code: refusal.FlagConflict, Severity: refusal.Refuse,
			Field: "--leave-out", Want: "one order file",
			Message: "a number to leave out is meant for one order, and several are named",
			Remedy:  "prepare that order by itself",
		})
	}
	faults = append(faults, f.places()...)
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
	jobs, all := f.work(lib, leaveOut, progressOn(e))
	if all.Refused() {
		return finish(e, f.json, doc, nil, all)
	}
	return f.write(e, jobs, all)
}

// places refuses flags and order files whose papers would go nowhere, or over
// each other: with several orders each gets a folder of its own name.
func (f *paperFlags) places() refusal.List {
	var out refusal.List
	fault := func(field, got, message, remedy string) {
		out = append(out, refusal.Reason{
			Code: refusal.FlagConflict, Severity: refusal.Refuse,
			Field: field, Got: got,
			Want:    "a place for each set of papers",
			Message: message,
			Remedy:  remedy,
		})
	}
	if f.set.Changed("out") && strings.TrimSpace(f.out) == "" {
		fault("--out", f.out, "--out names no folder", "name one, or leave --out out for the current folder")
	}
	if f.used < 0 {
		fault("--labels-used", strconv.Itoa(f.used),
			"--labels-used counts labels that are gone: it cannot be below nothing", "write 0 or more")
	}
	if len(f.orders) < 2 {
		return out
	}
	seen := map[string]string{}
	for _, path := range f.orders {
		name := nameOf(path)
		if other, twice := seen[strings.ToLower(name)]; twice {
			fault("ORDER", path, fmt.Sprintf("%s and %s would be written into one folder, %q", other, path, name),
				"rename one of them, or prepare them one by one into different folders")
		}
		seen[strings.ToLower(name)] = path
		if strings.Trim(name, ".") == "" {
			fault("ORDER", path, fmt.Sprintf("%s gives no name for its folder", path),
				"rename it, or prepare it by itself")
		}
	}
	return out
}

// numbers reads --leave-out 3,7.
func (f *paperFlags) numbers() (map[int]bool, refusal.List) {
	out := map[int]bool{}
	for _, s := range f.leaveOut {
		n, err := strconv.Atoi(strings.TrimSpace(s))
		if err != nil {
			return nil, refusal.List{{
				Code: refusal.FlagConflict, Severity: refusal.Refuse,
				Field: "--leave-out", Got: s,
				Want:    "syringe numbers such as 3,7",
				Message: fmt.Sprintf("%q is not the number of a syringe", s),
				Remedy:  "write the numbers as the table shows them",
			}}
		}
		out[n] = true
	}
	return out, nil
}

// work plans every order; all reasons of all orders come back.
func (f *paperFlags) work(lib library, leaveOut map[int]bool, tell progress) ([]*job, refusal.List) {
	var jobs []*job
	var all refusal.List
	for _, path := range f.orders {
		j, reasons := newJob(path, lib, f.when(nil), leaveOut, tell)
		all = append(all, reasons...)
		jobs = append(jobs, j)
	}
	return jobs, append(all, oneScheme(jobs)...)
}

// oneScheme refuses orders of one run whose labels would look in two ways.
func oneScheme(jobs []*job) refusal.List {
	var list []labels.Label
	for _, j := range jobs {
		if j != nil {
			list = append(list, j.labels...)
		}
	}
	return labels.OneScheme(list)
}

// when gives the time prepared: --at, else now if the command works in the
// moment, else the order's own.
func (f *paperFlags) when(now func() time.Time) func(order.Session) (time.Time, refusal.List) {
	return func(s order.Session) (time.Time, refusal.List) {
		zone := time.UTC
		if s.Prepared.Given() {
			zone = s.Prepared.Value.Location()
		}
		switch {
		case f.at != "":
			t, err := time.ParseInLocation("2006-01-02 15:04", f.at, zone)
			if err != nil {
				return t, refusal.List{{
					Code: refusal.TimeMalformed, Severity: refusal.Refuse,
					Field: "--at", Got: f.at,
					Want: `a time such as "2026-12-01 07:30"`, Rule: "R18",
					Message: fmt.Sprintf("%q is not a date and time", f.at),
					Remedy:  `write --at "2026-12-01 07:30"; it is read in the order's zone`,
				}}
			}
			if t.Format("2006-01-02 15:04") != f.at || sameWall(t, t.Add(time.Hour)) || sameWall(t, t.Add(-time.Hour)) {
				return t, refusal.List{{
					Code: refusal.TimeMalformed, Severity: refusal.Refuse,
					Field: "--at", Got: f.at,
					Want: "a time that the clock shows once", Rule: "R18",
					Message: fmt.Sprintf("the clocks change: %s is shown twice or not at all in this zone", f.at),
					Remedy:  `write the order's zone as an offset, such as zone = "+01:00"`,
				}}
			}
			return t, nil
		case now != nil:
			return now().In(zone).Truncate(time.Minute), nil
		}
		return s.Prepared.Value, nil
	}
}

// sameWall reports that a clock on the wall shows the same at both times.
func sameWall(a, b time.Time) bool {
	return a.Format("2006-01-02 15:04") == b.Format("2006-01-02 15:04")
}

// named leaves out names that were not given.
func named(files []string) []string {
	return slices.DeleteFunc(files, func(name string) bool { return name == "" })
}

// inputs is every file that was read.
func (f *paperFlags) inputs() []string {
	return named(slices.Concat(f.orders, f.formulary.files, []string{f.formulary.approval, f.shelf}))
}

// write places everything in memory, then writes it, then tells the user.
func (f *paperFlags) write(e env, jobs []*job, all refusal.List) int {
	doc := &planDocument{Syringes: []syringeJSON{}}
	var files []file
	for _, j := range jobs {
		dir := f.out
		if len(jobs) > 1 {
			dir = filepath.Join(f.out, j.name())
		}
		made, reasons := f.papers(j, dir, j.cautions(all))
		all = append(all, reasons...)
		files = append(files, made...)
	}
	if !all.Refused() {
		all = append(all, writeAll(files, f.inputs())...)
	}
	if all.Refused() {
		return finish(e, f.json, doc, nil, all)
	}
	if f.json {
		return f.tellJSON(e, jobs, files)
	}
	var b strings.Builder
	for _, j := range jobs {
		table(&b, j)
	}
	if f.explain {
		for _, j := range jobs {
			tellChoices(&b, j)
		}
	}
	tellFiles(&b, files)
	tellCautions(&b, all.Cautions())
	if _, err := io.WriteString(e.stdout, b.String()); err != nil {
		return outputFault(e, err)
	}
	return exitMade
}

// tellJSON prints the plan document itself, or a list of them when several
// orders were prepared.
func (f *paperFlags) tellJSON(e env, jobs []*job, files []file) int {
	var docs [][]byte
	for _, x := range files {
		if filepath.Base(x.path) == planName {
			docs = append(docs, bytes.TrimRight(x.data, "\n"))
		}
	}
	out := bytes.Join(docs, []byte(",\n"))
	if len(jobs) > 1 {
		out = append(append([]byte("[\n"), out...), "\n]"...)
	}
	if _, err := e.stdout.Write(append(out, '\n')); err != nil {
		return outputFault(e, err)
	}
	return exitMade
}

// planName is the file that is written last and marks a complete set.
const planName = "plan.json"

// papers makes the five files of one order in memory.
func (f *paperFlags) papers(j *job, dir string, cautions refusal.List) ([]file, refusal.List) {
	var files []file
	var all refusal.List
	add := func(name, title string, pages []ink.Page, reasons refusal.List) {
		all = append(all, reasons...)
		if reasons.Refused() || len(pages) == 0 {
			return
		}
		data, reasons := pdfOf(pages, title, j)
		all = append(all, reasons...)
		files = append(files, file{filepath.Join(dir, name), data})
	}
	pages, reasons := layouts.Sheets(j.drawUp, j.proofs())
	add("draw-up.pdf", "Draw-up sheet", pages, reasons)
	parts, reasons := f.labelParts(j)
	all = append(all, reasons...)
	for i, part := range parts {
		pages, reasons := part.pages(j, f.mono)
		add(partName(i, len(parts)), "Syringe labels", pages, reasons)
	}
	pages, reasons = layouts.Sheets(j.pumps, j.proofs())
	add("pump-cards.pdf", "Pump cards", pages, reasons)
	pages, reasons = layouts.Sheets(j.checks, j.proofs())
	add("check-sheets.pdf", "Check sheets", pages, reasons)
	doc := planOf(j)
	doc.take(cautions)
	data, err := encode(doc)
	if err != nil {
		all = append(all, ourFault(0, err))
	}
	return append(files, file{filepath.Join(dir, planName), data}), all
}

// foot is the note in the margin of a sheet of labels.
func (j *job) foot() []string {
	m := j.making
	foot := []string{
		"made " + m.Made + " by " + m.Preparer + ", " + m.Place,
		m.Formulary + ", " + m.State + ", digest " + m.Digest + j.withoutWords(),
	}
	if m.Invented {
		foot = append(foot, "invented demonstration")
	}
	return foot
}

// withoutWords says on a sheet of labels which syringes have none there. The
// margin is narrow: of many only the number is told, the draw-up sheet has all.
func (j *job) withoutWords() string {
	left := j.list.LeftOut
	switch n := len(left); {
	case n == 0:
		return ""
	case n > 6:
		return fmt.Sprintf("; %d syringes left out", n)
	}
	var numbers []string
	for _, l := range left {
		numbers = append(numbers, strconv.Itoa(l.Number))
	}
	return "; left out: syringe " + strings.Join(numbers, ", ")
}

// cautions are those of this order among all.
func (j *job) cautions(all refusal.List) refusal.List {
	var out refusal.List
	for _, r := range all.Cautions() {
		if r.Pos.File == "" || r.Pos.File == j.file {
			out = append(out, r)
		}
	}
	return out
}

func styleOf(o order.Order) quantity.Style {
	if o.Site.Style.Given() {
		return o.Site.Style.Value
	}
	return quantity.UK()
}

// proofs is what passed, as the layouts want it.
func (j *job) proofs() map[int]layouts.Proof {
	out := map[int]layouts.Proof{}
	for n, p := range j.passed {
		out[n] = p
	}
	return out
}
