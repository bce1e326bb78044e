package main

import (
	"fmt"
	"io"
	"strings"

	"github.com/spf13/pflag"

	"drawup/dilution/quantity/lint"
	"drawup/dilution/refusal"
)

// A wordingDocument is the answer of drawup wording: the text, and the same
// with every certain fix put in.
type wordingDocument struct {
	Style string `json:"style"`
	Text  string `json:"text"`
	Fixed string `json:"fixed"`
	findings
}

// runWording holds a sentence against the rules of numbers, units and names
// (rule R14) before it goes into a formulary, an order or a notice.
func runWording(e env, args []string) int {
	var style onceText
	var asJSON, help bool
	set := pflag.NewFlagSet("wording", pflag.ContinueOnError)
	set.SetOutput(io.Discard)
	set.Usage = func() {}
	set.Var(&style, "style", "uk, us or si")
	set.BoolVar(&asJSON, "json", false, "")
	set.BoolVarP(&help, "help", "h", false, "")
	doc := &wordingDocument{Style: "uk"}
	if err := set.Parse(args); err != nil {
		return finish(e, asJSON || wantsJSON(args), doc, nil, refusal.List{stopping(flagFault(err, []string{"style", "json", "help"}))})
	}
	if help {
		return showHelp(e, "wording")
	}
	if style.given {
		doc.Style = style.text
	}
	house, ok := lint.Named(doc.Style)
	if !ok {
		return finish(e, asJSON, doc, nil, refusal.List{stopping(refusal.Reason{
			Code: refusal.ValueUnknown, Field: "--style", Got: doc.Style, Want: "uk, us or si", Rule: "R14",
			Message: fmt.Sprintf("--style: got %q, want uk, us or si", doc.Style),
			Remedy:  "leave --style out or choose one of the three",
		})})
	}
	if set.NArg() != 1 || strings.TrimSpace(set.Arg(0)) == "" {
		return finish(e, asJSON, doc, nil, refusal.List{stopping(refusal.Reason{
			Code: refusal.FlagMissing, Field: "TEXT", Got: fmt.Sprintf("%d texts", set.NArg()), Want: "one sentence in quotes",
			Message: fmt.Sprintf("got %d texts, want one sentence", set.NArg()),
			Remedy:  `drawup wording "give 5 mg in 10 mL"`,
		})})
	}
	doc.Text = set.Arg(0)
	doc.Fixed, _ = house.Fixed(doc.Text)
	return finish(e, asJSON, doc, func(w io.Writer) { fmt.Fprintf(w, "nothing stops this sentence in style %s\n", house) }, wordingReasons(house, doc.Text))
}

func stopping(r refusal.Reason) refusal.Reason {
	r.Severity = refusal.Refuse
	return r
}

// wordingReasons is one reason for each finding.
func wordingReasons(house lint.House, text string) refusal.List {
	var out refusal.List
	for _, f := range house.Typed(text) {
		r := refusal.Reason{
			Code: refusal.TextMisread, Severity: refusal.Refuse, Field: "TEXT", Got: f.Got, Want: f.Rule.Says,
			Rule: "R14, " + f.Rule.Code, Source: f.Rule.Source,
			Message: fmt.Sprintf("%q: %s", f.Got, f.Rule.Fault),
			Remedy:  "want " + f.Rule.Says,
		}
		if f.Severity == lint.Warn {
			r.Severity = refusal.Caution
		}
		if f.Fix != "" {
			r.Remedy = fmt.Sprintf("write %q, if that is meant", f.Fix)
		}
		out = append(out, r)
	}
	return out
}

const helpWording = `drawup wording: hold a sentence against the rules of numbers, units and names
  drawup wording "give 5 mg in 10 mL"

  drawup wording TEXT [flags]

  --style            uk              house style of numbers and units: uk, us, si
  --json                             the answer as a JSON document, the text with every
                                     certain fix in it under "fixed"

What a label must not print is refused, what a person should look at again is a
caution. The rules, in the order of their codes:

`

// wordingHelp is the help of the command: the rules are those of the linter.
func wordingHelp() string {
	var b strings.Builder
	b.WriteString(helpWording)
	for _, r := range lint.Rules() {
		mark := "refused"
		if r.Severity == lint.Warn {
			mark = "caution"
		}
		for i, line := range wrap(r.Says, 64) {
			if i > 0 {
				fmt.Fprintf(&b, "  %s%s\n", pad("", 15), line)
				continue
			}
			fmt.Fprintf(&b, "  %s%s%s\n", pad(r.Code, 6), pad(mark, 9), line)
		}
	}
	return b.String()
}
