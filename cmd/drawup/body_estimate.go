package main

import (
	"errors"
	"fmt"
	"io"
	"strings"

	"drawup/dilution/body"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// An estimateJSON is one weight guessed from an age.
type estimateJSON struct {
	Rule     string        `json:"rule"`
	Weight   *quantityJSON `json:"weight"`
	Ages     string        `json:"ages"`
	Equation string        `json:"equation"`
	Source   string        `json:"source"`
	Known    string        `json:"known"` // how far off it was found
}

// An estimateDocument is the answer of drawup body --estimate. Estimated is the
// weight by the rule that was named; with all, Rules holds each that fits.
type estimateDocument struct {
	Estimated *quantityJSON  `json:"estimated_weight,omitempty"`
	Rules     []estimateJSON `json:"rules,omitempty"`
	findings
}

// runEstimate guesses a weight from an age.
func runEstimate(e env, r *request) int {
	r.need("age", "the rules go by it")
	r.forbid("a weight is guessed from the age alone", "weight", "height", "sex", "ideal")
	age := read(r, "age", body.ParseAge)
	doc := &estimateDocument{}
	text := r.texts["estimate"].text
	rules := body.AgeRules()
	if !strings.EqualFold(strings.TrimSpace(text), "all") {
		rule, ok := body.AgeRuleNamed(text)
		if !ok {
			r.add(refusal.Reason{
				Code: refusal.ValueUnknown, Field: "--estimate", Got: text, Want: ruleNames() + ", or all",
				Message: fmt.Sprintf("--estimate: got %q, want the published name of a rule", text),
				Remedy:  "choose one of: " + ruleNames() + "; or all, to see them side by side",
			})
		}
		rules = []body.AgeRule{rule}
	}
	if !r.refused() {
		doc.guess(r, rules, age)
	}
	if r.refused() {
		doc = &estimateDocument{}
	}
	return r.finish(e, doc, func(w io.Writer) { tellEstimate(w, doc, age) })
}

func ruleNames() string {
	var out []string
	for _, rule := range body.AgeRules() {
		out = append(out, rule.String())
	}
	return strings.Join(out, ", ")
}

// guess fills the document. One rule that does not fit is refused; of all of
// them, those that do not fit are left out with a caution.
func (d *estimateDocument) guess(r *request, rules []body.AgeRule, age body.Age) {
	var outside []refusal.Reason
	for _, rule := range rules {
		got, err := rule.Guess(age)
		if err != nil {
			outside = append(outside, ageFault(err))
			continue
		}
		d.Rules = append(d.Rules, estimateJSON{
			Rule: rule.String(), Weight: bodyWeightJSON(r.style, got.Weight), Ages: got.Ages, Equation: got.Equation,
			Source: got.Source, Known: got.Known,
		})
	}
	for _, x := range outside {
		if len(d.Rules) == 0 {
			r.add(x)
		} else {
			r.caution(x)
		}
	}
	if len(d.Rules) == 0 {
		return
	}
	if len(rules) == 1 {
		d.Estimated = d.Rules[0].Weight
	}
	r.estimateCaution(d.Rules)
}

// estimateCaution marks the figure as a guess.
func (r *request) estimateCaution(rules []estimateJSON) {
	var sources []string
	for _, x := range rules {
		sources = append(sources, x.Source)
	}
	r.caution(refusal.Reason{
		Code: refusal.WeightEstimated, Field: "--estimate", Rule: "R3",
		Got: "an estimate", Want: "a measured weight", Source: strings.Join(sources, "; "),
		Message: "this is an estimate from the age, not a weight; a child may weigh far more or far less",
		Remedy:  "weigh the child; an order that goes by an estimate says estimated = true",
	})
}

func ageFault(err error) refusal.Reason {
	x := refusal.Reason{Code: refusal.BodySizeOutside, Severity: refusal.Refuse, Field: "--age", Rule: "R3",
		Message: err.Error(), Remedy: "weigh the child, or use a rule for this age"}
	var outside *body.OutsideEquation
	if errors.As(err, &outside) {
		x.Source = outside.Source
	}
	return x
}

func tellEstimate(w io.Writer, d *estimateDocument, age body.Age) {
	if d.Estimated != nil {
		fmt.Fprintf(w, "about %s, ESTIMATED from an age of %s\n", d.Estimated.Printed, age)
	} else {
		fmt.Fprintf(w, "ESTIMATED from an age of %s, by each rule that is for it:\n", age)
	}
	for _, x := range d.Rules {
		line(w, x.Rule, fmt.Sprintf("%s%s, for %s", pad(x.Weight.Printed, 10), x.Equation, x.Ages))
		line(w, "", x.Known)
	}
}

// runAdjusted works the adjusted weight from an ideal one that is given.
func runAdjusted(e env, r *request) int {
	r.need("weight", "the adjusted weight lies between it and the ideal one")
	r.forbid("the ideal weight is given", "height", "sex", "age")
	size := body.Size{Weight: readWeight(r)}
	ideal := readWeightFlag(r, "ideal")
	doc := &bodyDocument{}
	if !r.refused() {
		doc.patientJSON = patient{weight: size.Weight}.echo(r.style)
		doc.Adjusted = r.weightOf(func() (quantity.BodyWeight, error) { return size.AdjustedFrom(ideal) })
	}
	return r.finish(e, doc, func(w io.Writer) { tellBody(w, doc) })
}
