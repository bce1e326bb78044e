package sheets

import (
	"fmt"
	"slices"
	"strings"

	"drawup/dilution"
	"drawup/dilution/refusal"
	"drawup/labels"
)

// A scribe writes the lines of one syringe on one paper.
type scribe struct {
	p    dilution.Plan
	f    labels.Facts
	rows *register
}

// scribesOf pairs plans with their facts. A plan without facts is written with
// empty figures, which no proof covers, so that it is never printed.
func scribesOf(list dilution.List, facts []labels.Facts, paper string) []scribe {
	out := make([]scribe, len(list.Plans))
	for i, p := range list.Plans {
		out[i].p, out[i].rows = p, newRegister(paper)
		if i < len(facts) {
			out[i].f = facts[i]
		}
	}
	return out
}

// say is a line with the figures that stand in braces: "make up to
// {final.volume}"; words of the formulary stand after a "=": "add {=glucose 5 %}".
// A figure that the plan does not have is an empty cell under its name, which
// no proof covers. Words that a user typed never go through here.
func (s scribe) say(pattern string) labels.Line {
	var out labels.Line
	for pattern != "" {
		head, rest, found := strings.Cut(pattern, "{")
		if head != "" {
			out = append(out, labels.Cell{Text: head})
		}
		if !found {
			break
		}
		name, tail, _ := strings.Cut(rest, "}")
		pattern = tail
		if quoted, ok := strings.CutPrefix(name, "="); ok {
			out = append(out, s.said(quoted)...)
			continue
		}
		out = append(out, labels.Cell{Text: s.f.Text(name), Figure: name})
	}
	return out
}

// drug is the name as it stands in running text, in the house style.
func (s scribe) drug() string {
	if s.p.Other != "" {
		return s.p.Name + " (" + s.p.Other + ")"
	}
	return s.p.Name
}

// bag reports whether the mixture is made in a bag, not in a syringe.
func (s scribe) bag() bool { return s.p.Mixture.InBag }

// numbered is what a paper is of, by its number in making order: "bag 3".
func (s scribe) numbered() string { return fmt.Sprintf("%s %d", s.vessel(), s.p.Number) }

// contents is the pattern of what is in one container as supplied.
func (s scribe) contents() string {
	second := ""
	if s.p.Presentation.SecondAmount.Given() {
		second = " with {second.container}"
	}
	if s.p.Presentation.Powder() {
		return "{container.amount}" + second + " of powder"
	}
	return "{container.amount}" + second + " in {container.volume}"
}

// container is the pattern of one container as supplied.
func (s scribe) container() string { return s.p.Presentation.Container + " " + s.contents() }

// containers is the pattern "2 ampoules of …" with the count as a figure.
func (s scribe) containers() string {
	kind := s.p.Presentation.Container
	if s.p.Mixture.Containers != 1 {
		kind += "s"
	}
	return "{container.count} " + kind
}

// patient is whom the syringe is for.
func (s scribe) patient() string {
	out := "patient " + s.p.Patient.ID.Value
	if s.p.Patient.Name.Given() {
		out += ", " + s.p.Patient.Name.Value
	}
	return out
}

// name is the head of the syringe with its concentration large.
func (s scribe) name(conc labels.Line, below labels.Line, large bool) Name {
	class, _ := labels.ClassFor(s.p) // no class, no band: the label itself is refused then
	drug := labels.Capital(s.drug())
	if s.p.Drug.ShowAs && s.p.Drug.CountedAs != "" {
		drug += " (" + s.p.Drug.CountedAs + ")"
	}
	return Name{Number: s.p.Number, Drug: drug, Class: class, Concentration: conc, Below: below, Large: large}
}

// of names the syringe on pages that continue and in the outline.
func (s scribe) of() string { return fmt.Sprintf("%d %s", s.p.Number, labels.Capital(s.drug())) }

// flags are the marks that the formulary's record gives the drug.
func (s scribe) flags() string { return strings.Join(s.p.Drug.Flags, ", ") }

// concentration is the pattern of what stands on the label, per mL.
func (s scribe) concentration() string {
	if s.f.Has("second.concentration") {
		return "{concentration} with {second.concentration}"
	}
	return "{concentration}"
}

// joined is lines set one after the other.
func joined(lines ...labels.Line) labels.Line {
	var out labels.Line
	for _, l := range lines {
		out = append(out, l...)
	}
	return out
}

// cautions are what the plan says of itself, then what the list says of it.
func (s scribe) cautions(list dilution.List) []Caution {
	var out []Caution
	seen := map[string]bool{}
	for _, r := range append(append(refusal.List{}, s.p.Cautions...), list.Cautions.Of(s.p.Number)...) {
		c := Caution{Text: s.cautioned(r), Code: string(r.Code)}
		if r.Source != "" {
			c.Note = labels.Words("source: " + r.Source)
		}
		if text := c.Text.Text(); !seen[text] {
			seen[text] = true
			out = append(out, c)
		}
	}
	return out
}

// cautioned is a caution as a sentence with figures. One on the reach of a
// body equation names the bounds of the published study, which no figure of
// the syringe could confirm: it stands in words.
func (s scribe) cautioned(r refusal.Reason) labels.Line {
	switch r.Code {
	case refusal.BodySizeOutside, refusal.LeanPlateau, refusal.AgeMissing:
		return labels.Words(inFull(r))
	case refusal.RateSlow: // the second route knows this sentence as it was written
		return joined(labels.Words("Slow start: "), s.said(r.Message+". "+sentence(r.Remedy)))
	}
	return s.said(inFull(r))
}

// inFull is what a reason says and what to do about it.
func inFull(r refusal.Reason) string {
	if r.Remedy == "" {
		return sentence(r.Message)
	}
	return sentence(r.Message) + " " + sentence(r.Remedy)
}

// gravity orders cautions for a sheet that may not hold all of them: what
// touches a limit first, then time, then what was measured, then the patient.
func gravity(c Caution) int {
	entry, _ := refusal.Lookup(refusal.Code(c.Code))
	return slices.Index([]refusal.Family{refusal.Choices, refusal.Patients, refusal.Measuring, refusal.Times, refusal.Limits}, entry.Family)
}

// gravest is the cautions with the gravest first, in their order otherwise.
func gravest(list []Caution) []Caution {
	out := slices.Clone(list)
	slices.SortStableFunc(out, func(a, b Caution) int { return gravity(b) - gravity(a) })
	return out
}

// sentence gives a text a capital and a full stop.
func sentence(text string) string {
	text = strings.TrimSpace(text)
	if text == "" {
		return ""
	}
	first := []rune(text)[0]
	text = strings.ToUpper(string(first)) + text[len(string(first)):]
	if stopped(text) {
		return text
	}
	return text + "."
}

func stopped(text string) bool { return strings.HasSuffix(text, ".") || strings.HasSuffix(text, "?") }
