package main

import (
	"bufio"
	"fmt"
	"io"
	"os"
	"strings"
	"time"

	"github.com/spf13/pflag"

	"drawup/dilution/formulary"
	"drawup/dilution/order"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/labels"
	"drawup/labels/gs1"
)

// A readRequest is what was typed after drawup read.
type readRequest struct {
	text       string
	at, order  onceText
	styled     onceText
	own        formularyFlags
	style      quantity.Style
	json, help bool
	faults     refusal.List
}

func (r *readRequest) add(x refusal.Reason) {
	x.Severity = refusal.Refuse
	r.faults = append(r.faults, x)
}

// runRead says in words what a scanned code says.
func runRead(e env, args []string) int {
	r, words := newReadRequest(args)
	if r.help {
		return showHelp(e, "read")
	}
	doc := &readDocument{Elements: []elementJSON{}}
	if !r.faults.Refused() {
		r.take(e, words)
	}
	now := r.clock(e.now)
	if r.faults.Refused() {
		return finish(e, r.json, doc, nil, r.faults)
	}
	lib, faults := libraryOf(r.own)
	if faults.Refused() {
		return finish(e, r.json, doc, nil, faults)
	}
	form := lib.form
	products := r.products(form)
	if r.faults.Refused() {
		return finish(e, r.json, doc, nil, r.faults)
	}
	r.read(doc, form, products, now)
	return finish(e, r.json, doc, func(w io.Writer) { tellRead(w, doc) }, r.faults)
}

func newReadRequest(args []string) (*readRequest, []string) {
	r := &readRequest{style: quantity.UK()}
	set := pflag.NewFlagSet("read", pflag.ContinueOnError)
	set.SetOutput(io.Discard)
	set.Usage = func() {}
	set.Var(&r.at, "at", "time to hold the use-by against")
	set.Var(&r.order, "order", "order with the site's GTINs")
	set.Var(&r.styled, "style", "uk, us or si")
	set.StringSliceVar(&r.own.files, "formulary", nil, "the site's own formulary files")
	set.BoolVar(&r.json, "json", false, "")
	set.BoolVarP(&r.help, "help", "h", false, "")
	if err := set.Parse(args); err != nil {
		r.json = r.json || wantsJSON(args)
		r.add(flagFault(err, []string{"at", "order", "style", "formulary", "json", "help"}))
		return r, nil
	}
	if r.styled.given {
		style, ok := quantity.StyleNamed(r.styled.text)
		if !ok {
			r.add(refusal.Reason{
				Code: refusal.ValueUnknown, Field: "--style", Got: r.styled.text, Want: "uk, us or si", Rule: "R14",
				Message: fmt.Sprintf("--style: got %q, want uk, us or si", r.styled.text),
				Remedy:  "leave --style out or choose one of the three",
			})
		}
		r.style = style
	}
	return r, set.Args()
}

// take takes the text from the command line, or one line from standard input.
func (r *readRequest) take(e env, words []string) {
	switch len(words) {
	case 0:
		if prompts(e) {
			fmt.Fprint(e.stderr, "scan the code, or type it and press Enter: ")
		}
		line, err := bufio.NewReader(io.LimitReader(e.stdin, 1<<16)).ReadString('\n')
		if err != nil && err != io.EOF {
			r.add(refusal.Reason{
				Code: refusal.FileUnreadable, Field: "standard input", Want: "one line",
				Message: "standard input cannot be read: " + err.Error(), Remedy: "type the code after drawup read, in quotes",
			})
		}
		r.text = line
	case 1:
		r.text = words[0]
	default:
		r.add(refusal.Reason{
			Code: refusal.FlagUnknown, Field: "argument", Got: strings.Join(words, " "), Want: "one code",
			Message: fmt.Sprintf("got %d texts, want one code", len(words)),
			Remedy:  "put the code in quotes, so that the shell leaves its signs alone",
		})
	}
}

// prompts reports that a person sits before the terminal.
func prompts(e env) bool {
	f, ok := e.stdin.(*os.File)
	if !ok {
		return false
	}
	info, err := f.Stat()
	return err == nil && info.Mode()&os.ModeCharDevice != 0
}

// clock is the time to compare with, as a clock on the wall shows it: a code
// holds no zone, so that both are taken as of the same place (rule R18).
func (r *readRequest) clock(now func() time.Time) time.Time {
	if !r.at.given {
		t := now()
		return time.Date(t.Year(), t.Month(), t.Day(), t.Hour(), t.Minute(), 0, 0, time.UTC)
	}
	t, err := time.Parse("2006-01-02 15:04", r.at.text)
	if err != nil {
		r.add(refusal.Reason{
			Code: refusal.TimeMalformed, Field: "--at", Got: r.at.text, Want: `a time such as "2026-12-01 12:00"`, Rule: "R18",
			Message: fmt.Sprintf("%q is not a date and time", r.at.text), Remedy: `write --at "2026-12-01 12:00"`,
		})
	}
	return t
}

// products are the site's own numbers in the order that was named.
func (r *readRequest) products(form *formulary.Formulary) []labels.Product {
	if !r.order.given {
		return nil
	}
	data, faults := readFile(r.order.text)
	if faults.Refused() {
		r.faults = append(r.faults, faults...)
		return nil
	}
	o, faults := order.Read(r.order.text, data)
	r.faults = append(r.faults, faults.Refusals()...)
	products, faults := productsOf(o, form)
	r.faults = append(r.faults, faults...)
	return products
}

// read fills the document, or the faults.
func (r *readRequest) read(doc *readDocument, form *formulary.Formulary, products []labels.Product, now time.Time) {
	scanned, faults := gs1.Scan(r.text)
	var coded labels.Coded
	if len(faults) == 0 {
		coded, faults = labels.ReadCode(scanned, now)
	}
	for _, f := range faults {
		r.faults = append(r.faults, r.codeFault(f, now))
	}
	if len(faults) > 0 {
		return
	}
	doc.scanned(scanned, coded.Kind)
	doc.coded(r.style, coded)
	r.name(doc, coded, form, products)
	r.until(doc, coded, now)
	r.doubts(scanned)
}
