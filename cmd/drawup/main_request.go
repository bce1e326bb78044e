package main

import (
	"errors"
	"fmt"
	"io"
	"strings"

	"github.com/spf13/pflag"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// A flagSpec is one flag of a command that takes a text.
type flagSpec struct {
	name    string
	example string // what a right value looks like
	use     string // what it is for
}

// A request is what the user typed for one command, read flag by flag. Faults
// are gathered, so that all are told at once.
type request struct {
	name   string
	specs  []flagSpec
	flags  *pflag.FlagSet
	texts  map[string]*onceText
	json   bool
	help   bool
	broken bool // the flags could not be read to the end
	style  quantity.Style
	faults refusal.List
	stored *formulary.Formulary // once a sum has asked for it
}

// An onceText is a flag's text that may be given once only: the last of two
// doses must not win silently. Where many are asked for, all holds each.
type onceText struct {
	text  string
	given bool
	many  bool
	all   []string
}

func (t *onceText) String() string { return t.text }

// Type is the word that pflag shows for the value.
func (t *onceText) Type() string { return "text" }

// Set is called by pflag for each time the flag is typed.
func (t *onceText) Set(s string) error {
	if t.given && !t.many {
		return errGivenTwice
	}
	if strings.HasPrefix(s, "--") { // the next flag stands where the value should
		return errNoValue
	}
	t.text, t.given, t.all = s, true, append(t.all, s)
	return nil
}

var (
	errGivenTwice = errors.New("the flag is given twice")
	errNoValue    = errors.New("the flag has no value")
)

// newRequest reads args for the command name, whose own flags are specs.
func newRequest(name string, specs []flagSpec, args []string) *request {
	r := &request{name: name, specs: specs, texts: map[string]*onceText{}}
	r.flags = pflag.NewFlagSet(name, pflag.ContinueOnError)
	r.flags.SetOutput(io.Discard)
	r.flags.Usage = func() {}
	for _, s := range specs {
		r.addFlag(s.name, s.use)
	}
	if give, ok := r.texts["give"]; ok { // one for each drug and site
		give.many = true
	}
	r.addFlag("style", "uk, us or si")
	r.flags.BoolVar(&r.json, "json", false, "")
	r.flags.BoolVarP(&r.help, "help", "h", false, "")
	if err := r.flags.Parse(args); err != nil {
		r.json, r.broken = r.json || wantsJSON(args), true
		r.add(flagFault(err, r.flagNames()))
	}
	for _, extra := range r.flags.Args() {
		r.add(refusal.Reason{
			Code: refusal.FlagUnknown, Field: "argument", Got: extra, Want: "flags only",
			Message: fmt.Sprintf("got %q, want flags only", extra),
			Remedy:  `put the quantity in quotes and its flag before it: --weight "72 kg"`,
		})
	}
	r.style = r.readStyle()
	return r
}

func (r *request) addFlag(name, use string) {
	t := &onceText{}
	r.texts[name] = t
	r.flags.Var(t, name, use)
}

func (r *request) flagNames() []string {
	names := []string{"json", "style", "help"}
	for _, s := range r.specs {
		names = append(names, s.name)
	}
	return names
}

func (r *request) readStyle() quantity.Style {
	t := r.texts["style"]
	if !t.given {
		return quantity.UK()
	}
	s, ok := quantity.StyleNamed(t.text)
	if !ok {
		r.add(refusal.Reason{
			Code: refusal.ValueUnknown, Field: "--style", Got: t.text, Want: "uk, us or si", Rule: "R14",
			Message: fmt.Sprintf("--style: got %q, want uk, us or si", t.text),
			Remedy:  "leave --style out or choose one of the three",
		})
		return quantity.UK()
	}
	return s
}

// wantsJSON finds --json when the flags as a whole cannot be read.
func wantsJSON(args []string) bool {
	for _, a := range args {
		if a == "--json" || a == "--json=true" {
			return true
		}
	}
	return false
}

// add takes in a refusal.
func (r *request) add(x refusal.Reason) {
	if x.Severity == 0 {
		x.Severity = refusal.Refuse
	}
	r.faults = append(r.faults, x)
}

// caution takes in a caution.
func (r *request) caution(x refusal.Reason) {
	x.Severity = refusal.Caution
	r.faults = append(r.faults, x)
}

// refused reports whether anything so far stops the work.
func (r *request) refused() bool { return r.faults.Refused() }

// given reports whether the flag was typed.
func (r *request) given(name string) bool {
	t, ok := r.texts[name]
	return ok && t.given
}

// count is how many of the flags were typed.
func (r *request) count(names ...string) int {
	n := 0
	for _, name := range names {
		if r.given(name) {
			n++
		}
	}
	return n
}

// exactlyOne refuses none and more than one of the flags.
func (r *request) exactlyOne(names ...string) {
	if r.broken {
		return
	}
	switch n := r.count(names...); {
	case n == 0:
		r.add(refusal.Reason{
			Code: refusal.FlagMissing, Field: flagList(names), Want: "one of " + flagList(names),
			Message: "got none of " + flagList(names) + ", want one",
			Remedy:  r.remedyFor(names[0]),
		})
	case n > 1:
		r.conflict(names, "want exactly one of them")
	}
}

// atMostOne refuses more than one of the flags.
func (r *request) atMostOne(names ...string) {
	if r.count(names...) > 1 {
		r.conflict(names, "want at most one of them")
	}
}

func (r *request) conflict(names []string, want string) {
	var typed []string
	for _, name := range names {
		if r.given(name) {
			typed = append(typed, name)
		}
	}
	r.add(refusal.Reason{
		Code: refusal.FlagConflict, Field: flagList(typed), Got: flagList(typed), Want: want,
		Message: "got " + flagList(typed) + ", " + want,
		Remedy:  "leave all but one of them out",
	})
}

// need refuses when the flag is missing.
func (r *request) need(name, why string) {
	if r.given(name) || r.broken {
		return
	}
	r.add(refusal.Reason{
		Code: refusal.FlagMissing, Field: "--" + name, Want: "--" + name,
		Message: "--" + name + " is missing: " + why, Remedy: r.remedyFor(name),
	})
}

// forbid refuses a flag that has no part in the sum.
func (r *request) forbid(why string, names ...string) {
	for _, name := range names {
		if !r.given(name) {
			continue
		}
		r.add(refusal.Reason{
			Code: refusal.FlagConflict, Field: "--" + name, Got: r.texts[name].text,
			Message: "--" + name + " has no part in this sum: " + why,
			Remedy:  "leave --" + name + " out, or correct the other flags",
		})
	}
}

func (r *request) remedyFor(name string) string {
	for _, s := range r.specs {
		if s.name == name {
			return fmt.Sprintf("add --%s %q", name, s.example)
		}
	}
	return "add --" + name
}

// finish writes the answer of r.
func (r *request) finish(e env, doc document, text func(io.Writer)) int {
	return finish(e, r.json, doc, text, r.faults)
}

// read is the value of a flag, or the zero value when the flag was not typed
// or cannot be read; the fault is then gathered.
func read[T any](r *request, name string, parse func(string) (T, error)) T {
	var none T
	t := r.texts[name]
	if !t.given {
		return none
	}
	return readText(r, "--"+name, t.text, parse)
}

// readText is the value of a text, or the zero value and a fault.
func readText[T any](r *request, field, text string, parse func(string) (T, error)) T {
	v, err := parse(text)
	if err != nil {
		r.add(faultOf(field, err))
		var none T
		return none
	}
	return v
}

func flagList(names []string) string {
	out := make([]string, len(names))
	for i, n := range names {
		out[i] = "--" + n
	}
	return strings.Join(out, ", ")
}
