package main

import (
	"fmt"
	"io"
	"slices"
	"strings"
	"unicode/utf8"

	"github.com/spf13/pflag"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/labels"
)

// A formularyRequest is what was typed after drawup formulary.
type formularyRequest struct {
	verb       string   // list or show
	words      []string // of the drug's name
	class      onceText
	json, help bool
	faults     refusal.List
}

func (r *formularyRequest) add(x refusal.Reason) {
	x.Severity = refusal.Refuse
	r.faults = append(r.faults, x)
}

func readFormularyRequest(args []string) *formularyRequest {
	r := &formularyRequest{}
	set := pflag.NewFlagSet("formulary", pflag.ContinueOnError)
	set.SetOutput(io.Discard)
	set.Usage = func() {}
	set.Var(&r.class, "class", "label class")
	set.BoolVar(&r.json, "json", false, "")
	set.BoolVarP(&r.help, "help", "h", false, "")
	if err := set.Parse(args); err != nil {
		r.json = r.json || wantsJSON(args)
		r.faults = refusal.List{flagFault(err, []string{"class", "json", "help"})}
		return r
	}
	if words := set.Args(); len(words) > 0 {
		r.verb, r.words = words[0], words[1:]
	}
	r.check()
	return r
}

// check refuses what list or show cannot take.
func (r *formularyRequest) check() {
	switch r.verb {
	case "list":
		if len(r.words) > 0 {
			name := strings.Join(r.words, " ")
			r.add(refusal.Reason{Code: refusal.FlagUnknown, Field: "argument", Got: name, Want: "nothing after list",
				Message: fmt.Sprintf("got %q after list, want nothing", name), Remedy: "to see one drug type drawup formulary show " + name})
		}
		r.checkClass()
	case "show":
		if len(r.words) == 0 {
			r.add(refusal.Reason{Code: refusal.FlagMissing, Field: "DRUG", Want: "the name of a drug", Message: "no drug is named",
				Remedy: "name one, as in drawup formulary show noradrenaline; drawup formulary list shows what there is"})
		}
		if r.class.given {
			r.add(refusal.Reason{Code: refusal.FlagConflict, Field: "--class", Got: r.class.text, Want: "no class", Message: "--class has no part in showing one drug",
				Remedy: "leave --class out, or type drawup formulary list"})
		}
	case "":
		r.add(refusal.Reason{Code: refusal.FlagMissing, Field: "command", Want: "list or show", Message: "got nothing after formulary, want list or show",
			Remedy: "type drawup formulary list"})
	default:
		r.add(refusal.Reason{Code: refusal.FlagUnknown, Field: "command", Got: r.verb, Want: "list or show", Message: fmt.Sprintf("got %q after formulary, want list or show", r.verb),
			Remedy: nearestOr(r.verb, []string{"list", "show"}, "", "type drawup formulary list, or drawup formulary show with the name of a drug")})
	}
}

// checkClass wants a class that labels have, so that a slip does not look like
// a class without drugs.
func (r *formularyRequest) checkClass() {
	if !r.class.given {
		return
	}
	r.class.text = strings.ToUpper(strings.TrimSpace(r.class.text))
	if _, ok := labels.ClassOf(r.class.text); ok {
		return
	}
	var codes []string
	for _, c := range labels.Classes() {
		codes = append(codes, c.Code)
	}
	r.add(refusal.Reason{Code: refusal.ValueUnknown, Field: "--class", Got: r.class.text, Want: "one of " + strings.Join(codes, ", "),
		Message: fmt.Sprintf("--class: got %q, want the code of a label class", r.class.text), Remedy: "the classes are " + strings.Join(codes, ", ")})
}

// runFormulary shows what the formulary holds. It changes nothing.
func runFormulary(e env, args []string) int {
	r := readFormularyRequest(args)
	if r.help {
		return showHelp(e, "formulary")
	}
	if r.faults.Refused() {
		return finish(e, r.json, &bareDocument{}, nil, r.faults)
	}
	f, err := formulary.Default()
	if err != nil {
		return finish(e, r.json, &bareDocument{}, nil, refusal.List{ourFault(0, err)})
	}
	if r.verb == "list" {
		doc := &drugsDocument{Formulary: headOf(f), Drugs: listDrugs(f, r.class.text)}
		return finish(e, r.json, doc, func(w io.Writer) { tellDrugs(w, doc) }, nil)
	}
	doc := &drugDocument{Formulary: headOf(f)}
	name := strings.Join(r.words, " ")
	d, near, ok := f.Find(name)
	if !ok {
		return finish(e, r.json, doc, nil, refusal.List{unknownDrug(name, near)})
	}
	doc.Drug = drugOf(quantity.UK(), d)
	return finish(e, r.json, doc, func(w io.Writer) { showDrug(w, doc.Formulary, doc.Drug) }, nil)
}

func unknownDrug(name string, near []string) refusal.Reason {
	remedy := "check the spelling; drawup formulary list shows what there is"
	if len(near) > 0 {
		remedy = "was " + strings.Join(near, " or ") + " meant? drawup formulary list shows what there is"
	}
	return refusal.Reason{Code: refusal.DrugUnknown, Severity: refusal.Refuse, Field: "DRUG", Got: name, Want: "a drug of the formulary", Rule: "R10",
		Message: fmt.Sprintf("%q is not in the formulary", name), Remedy: remedy}
}

// listDrugs is the drugs of one class, or all, in order of name.
func listDrugs(f *formulary.Formulary, class string) []listedDrug {
	out := []listedDrug{}
	for _, d := range f.Drugs() {
		if class == "" || d.Class == class {
			out = append(out, listedOf(d))
		}
	}
	return out
}

// Widths of the columns of the list, with two blanks between them. With the
// longest row of marks they stay within widest; a test measures it.
const (
	nameColumn  = 31
	alsoColumn  = 18
	classColumn = 31
)

// tellDrugs writes one line a drug. Nothing is cut: other names that find no
// room are counted, and formulary show has them all.
func tellDrugs(w io.Writer, doc *drugsDocument) {
	firstLine(w, doc.Formulary)
	fmt.Fprintln(w)
	if len(doc.Drugs) == 0 {
		fmt.Fprintln(w, "no drug of this class")
		return
	}
	cells := func(name, also, class, flags string) {
		line := pad(name, nameColumn+2) + pad(also, alsoColumn+2) + pad(class, classColumn+2) + flags
		fmt.Fprintln(w, strings.TrimRight(line, " "))
	}
	cells("drug", "other names", "class", "flags")
	used := map[string]bool{}
	for _, d := range doc.Drugs {
		var marks []string
		for _, f := range d.Flags {
			used[f] = true
			marks = append(marks, markOf(f))
		}
		cells(d.Name, shortNames(d.Also, alsoColumn), d.Class+" "+d.ClassWord, strings.Join(marks, " "))
	}
	tellMarks(w, used)
	fmt.Fprintln(w, "\nType drawup formulary show DRUG for all that is stored of one drug, with its sources.")
}

// tellMarks spells out the marks that were used, three in a line.
func tellMarks(w io.Writer, used map[string]bool) {
	var flags []string
	for f := range used {
		flags = append(flags, f)
	}
	slices.SortFunc(flags, func(a, b string) int { return strings.Compare(markOf(a), markOf(b)) })
	if len(flags) > 0 {
		fmt.Fprintln(w)
	}
	for three := range slices.Chunk(flags, 3) {
		line := ""
		for _, f := range three {
			line += pad(markOf(f)+" "+f, 34)
		}
		fmt.Fprintln(w, strings.TrimRight(line, " "))
	}
}

// shortNames is as many names as find room in width, and how many more.
func shortNames(names []string, width int) string {
	for n := len(names); n > 0; n-- {
		s := strings.Join(names[:n], ", ")
		if n < len(names) {
			s += fmt.Sprintf(" +%d", len(names)-n)
		}
		if utf8.RuneCountInString(s) <= width {
			return s
		}
	}
	if len(names) == 0 {
		return ""
	}
	return fmt.Sprintf("(%d)", len(names))
}

// markOf is the two letters that stand for a flag in the list; a flag without a
// mark is written out.
func markOf(flag string) string {
	switch flag {
	case "high alert":
		return "HA"
	case "controlled":
		return "CD"
	case "protect from light":
		return "PL"
	case "filter needle":
		return "FN"
	case "in-line filter":
		return "IF"
	case "large vein":
		return "LV"
	case "central line preferred":
		return "CL"
	case "paralysing":
		return "PA"
	case "emulsion":
		return "EM"
	case "no preservative for neuraxial":
		return "NP"
	case "vesicant":
		return "VE"
	case "separate line":
		return "SL"
	case "shake or invert":
		return "SH"
	case "keep refrigerated":
		return "KR"
	}
	return flag
}
