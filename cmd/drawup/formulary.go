package main

import (
	"fmt"
	"io"
	"strings"

	"github.com/spf13/pflag"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/labels"
)

// A formularyRequest is what was typed after drawup formulary.
type formularyRequest struct {
	verb         string
	words        []string // after the verb
	class        onceText
	flag         onceText
	jurisdiction onceText
	out          onceText
	at           onceText
	review       onceText
	use, route   onceText
	signers      []string
	own          formularyFlags
	json, help   bool
	faults       refusal.List
}

func (r *formularyRequest) add(x refusal.Reason) {
	x.Severity = refusal.Refuse
	r.faults = append(r.faults, x)
}

// A formularyVerb is one row of the table: drawup formulary NAME.
type formularyVerb struct {
	name  string
	wants string // what stands after it, for messages
	takes []string
	least int // words after it
	most  int
	run   func(e env, r *formularyRequest) int
}

// formularyVerbs is the table, in the order in which messages list it.
func formularyVerbs() []formularyVerb {
	return []formularyVerb{
		{"list", "nothing", []string{"class", "flag", "jurisdiction", "formulary", "approval", "at"}, 0, 0, runFormularyList},
		{"show", "the name of a drug", []string{"formulary", "approval", "at"}, 1, 12, runFormularyShow},
		{"pair", "two drugs with the word with between them", []string{"formulary", "approval", "at", "use", "route"}, 3, 24, runFormularyPair},
		{"verify", "a formulary file, or nothing for the starter", nil, 0, 40, runFormularyVerify},
		{"compare", "two formularies, the older first", nil, 2, 2, runFormularyCompare},
		{"print", "nothing", []string{"formulary", "approval", "at", "out"}, 0, 0, runFormularyPrint},
		{"standards", "nothing", []string{"formulary", "out"}, 0, 0, runFormularyStandards},
		{"approval", "nothing", []string{"formulary", "at", "review", "signed", "out"}, 0, 0, runFormularyApproval},
		{"schema", "nothing", nil, 0, 0, runFormularySchema},
	}
}

func verbNames() []string {
	var out []string
	for _, v := range formularyVerbs() {
		out = append(out, v.name)
	}
	return out
}

func readFormularyRequest(args []string) (*formularyRequest, formularyVerb) {
	r := &formularyRequest{}
	set := pflag.NewFlagSet("formulary", pflag.ContinueOnError)
	set.SetOutput(io.Discard)
	set.Usage = func() {}
	set.Var(&r.class, "class", "label class")
	set.Var(&r.flag, "flag", "mark of a drug")
	set.Var(&r.jurisdiction, "jurisdiction", "where a source holds")
	set.Var(&r.out, "out", "file to write")
	set.Var(&r.at, "at", "day")
	set.Var(&r.use, "use", "bolus or infusion")
	set.Var(&r.route, "route", "route")
	set.Var(&r.review, "review", "last day of the approval")
	set.StringArrayVar(&r.signers, "signed", nil, "name and role")
	set.StringSliceVar(&r.own.files, "formulary", nil, "")
	set.StringVar(&r.own.approval, "approval", "", "")
	set.BoolVar(&r.json, "json", false, "")
	set.BoolVarP(&r.help, "help", "h", false, "")
	if err := set.Parse(args); err != nil {
		r.json = r.json || wantsJSON(args)
		var names []string
		set.VisitAll(func(x *pflag.Flag) { names = append(names, x.Name) })
		r.faults = refusal.List{flagFault(err, names)}
		return r, formularyVerb{}
	}
	if words := set.Args(); len(words) > 0 {
		r.verb, r.words = words[0], words[1:]
	}
	return r, r.check(set)
}

// check finds the verb and refuses what it cannot take.
func (r *formularyRequest) check(set *pflag.FlagSet) formularyVerb {
	if r.help {
		return formularyVerb{}
	}
	want := strings.Join(verbNames(), ", ")
	if r.verb == "" {
		r.add(refusal.Reason{Code: refusal.FlagMissing, Field: "command", Want: "one of " + want, Message: "got nothing after formulary, want one of " + want,
			Remedy: "type drawup formulary list"})
		return formularyVerb{}
	}
	for _, v := range formularyVerbs() {
		if v.name == r.verb {
			r.fits(v, set)
			return v
		}
	}
	r.add(refusal.Reason{Code: refusal.FlagUnknown, Field: "command", Got: r.verb, Want: "one of " + want, Message: fmt.Sprintf("got %q after formulary, want one of %s", r.verb, want),
		Remedy: nearestOr(r.verb, verbNames(), "", "type drawup help formulary")})
	return formularyVerb{}
}

// fits holds words and flags against what the verb takes.
func (r *formularyRequest) fits(v formularyVerb, set *pflag.FlagSet) {
	words := strings.Join(r.words, " ")
	remedy := "type drawup help formulary for an example"
	if v.most == 0 {
		remedy = "to see one drug type drawup formulary show " + words
	}
	switch {
	case len(r.words) < v.least:
		r.add(refusal.Reason{Code: refusal.FlagMissing, Field: "argument", Got: words, Want: v.wants,
			Message: fmt.Sprintf("%s wants %s", v.name, v.wants), Remedy: "type drawup help formulary for an example"})
	case len(r.words) > v.most:
		r.add(refusal.Reason{Code: refusal.FlagUnknown, Field: "argument", Got: words, Want: v.wants + " after " + v.name,
			Message: fmt.Sprintf("got %q after %s, want %s", words, v.name, v.wants), Remedy: remedy})
	}
	set.Visit(func(f *pflag.Flag) {
		if f.Name == "json" || f.Name == "help" {
			return
		}
		for _, t := range v.takes {
			if t == f.Name {
				return
			}
		}
		r.add(refusal.Reason{Code: refusal.FlagConflict, Field: "--" + f.Name, Got: f.Value.String(), Want: "no --" + f.Name,
			Message: fmt.Sprintf("--%s has no part in formulary %s", f.Name, v.name), Remedy: "leave it out, or type drawup help formulary"})
	})
}

// runFormulary shows, checks, compares or prints what the formulary holds.
func runFormulary(e env, args []string) int {
	r, v := readFormularyRequest(args)
	if r.help {
		return showHelp(e, "formulary")
	}
	if r.faults.Refused() || v.run == nil {
		return finish(e, r.json, &bareDocument{}, nil, r.faults)
	}
	return v.run(e, r)
}

// open is the formulary that the flags name, as it stands at the time of the
// work.
func (r *formularyRequest) open(e env) (*formulary.Formulary, refusal.List) {
	lib, faults := libraryOf(r.own)
	if faults.Refused() {
		return nil, faults
	}
	at, late := r.day(e)
	if late.Refused() {
		return nil, append(faults, late...)
	}
	f, lapsed := lib.at(at)
	return f, append(faults, lapsed...)
}

func runFormularyShow(e env, r *formularyRequest) int {
	f, faults := r.open(e)
	doc := &drugDocument{}
	if faults.Refused() {
		return finish(e, r.json, doc, nil, faults)
	}
	doc.Formulary = headOf(f)
	name := strings.Join(r.words, " ")
	d, near, ok := f.Find(name)
	if !ok {
		return finish(e, r.json, doc, nil, refusal.List{unknownDrug(name, near)})
	}
	doc.Drug = drugOf(quantity.UK(), d)
	doc.Pairs = pairsOf(f, d.Name)
	return finish(e, r.json, doc, func(w io.Writer) { showDrug(w, doc) }, nil)
}

func unknownDrug(name string, near []string) refusal.Reason {
	remedy := "check the spelling; drawup formulary list shows what there is"
	if len(near) > 0 {
		remedy = "was " + strings.Join(near, " or ") + " meant? drawup formulary list shows what there is"
	}
	return refusal.Reason{Code: refusal.DrugUnknown, Severity: refusal.Refuse, Field: "DRUG", Got: name, Want: "a drug of the formulary", Rule: "R10",
		Message: fmt.Sprintf("%q is not in the formulary", name), Remedy: remedy}
}

// checkClass wants a class that labels have, so that a slip does not look like
// a class without drugs.
func (r *formularyRequest) checkClass() refusal.List {
	if !r.class.given {
		return nil
	}
	r.class.text = strings.ToUpper(strings.TrimSpace(r.class.text))
	if _, ok := labels.ClassOf(r.class.text); ok {
		return nil
	}
	var codes []string
	for _, c := range labels.Classes() {
		codes = append(codes, c.Code)
	}
	return refusal.List{{Code: refusal.ValueUnknown, Severity: refusal.Refuse, Field: "--class", Got: r.class.text, Want: "one of " + strings.Join(codes, ", "),
		Message: fmt.Sprintf("--class: got %q, want the code of a label class", r.class.text), Remedy: "the classes are " + strings.Join(codes, ", ")}}
}
