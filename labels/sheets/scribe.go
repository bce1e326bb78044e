package sheets

import (
	"fmt"
	"math/big"
	"strings"

	"drawup/dilution"
	"drawup/dilution/refusal"
	"drawup/labels"
)

// A scribe writes the lines of one syringe.
type scribe struct {
	p dilution.Plan
	f labels.Facts
}

// scribesOf pairs plans with their facts. A plan without facts is written with
// empty figures, which no proof covers, so that it is never printed.
func scribesOf(list dilution.List, facts []labels.Facts) []scribe {
	out := make([]scribe, len(list.Plans))
	for i, p := range list.Plans {
		out[i].p = p
		if i < len(facts) {
			out[i].f = facts[i]
		}
	}
	return out
}

// say is a line with the figures that stand in braces: "make up to
// {final.volume}". A figure that the plan does not have is an empty cell under
// its name, which no proof covers. Words that a user typed never go through
// here.
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
		out = append(out, labels.Cell{Text: s.f.Text(name), Figure: name})
		pattern = tail
	}
	return out
}

// drug is the name as it stands in running text, in the house style.
func (s scribe) drug() string { return s.p.Drug.LabelName(s.p.Style) }

// bag reports whether the mixture is made in a bag, not in a syringe.
func (s scribe) bag() bool { return s.p.Mixture.InBag }

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

// name is the head of the syringe.
func (s scribe) name(conc labels.Line, below labels.Line, large bool) Name {
	class, _ := labels.ClassOf(s.p.Drug.Class) // no class, no band: the label itself is refused then
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
		c := cautionOf(r)
		if !seen[c.Text] {
			seen[c.Text] = true
			out = append(out, c)
		}
	}
	return out
}

func cautionOf(r refusal.Reason) Caution {
	c := Caution{Text: sentence(r.Message), Code: string(r.Code)}
	if r.Remedy != "" {
		c.Text += " " + sentence(r.Remedy)
	}
	if r.Source != "" {
		c.Note = "source: " + r.Source
	}
	return c
}

// sentence gives a text a capital and a full stop.
func sentence(text string) string {
	text = strings.TrimSpace(text)
	if text == "" {
		return ""
	}
	first := []rune(text)[0]
	text = strings.ToUpper(string(first)) + text[len(string(first)):]
	if strings.HasSuffix(text, ".") || strings.HasSuffix(text, "?") {
		return text
	}
	return text + "."
}

// rounded is r in at most seven significant digits for the eye, "about" before
// it when that is not all of it. It serves working lines only; the figures
// themselves are printed from the facts.
func rounded(r *big.Rat) string {
	exact := r.FloatString(12)
	exact = strings.TrimRight(strings.TrimRight(exact, "0"), ".")
	if x, ok := new(big.Rat).SetString(exact); ok && x.Cmp(r) == 0 && len(exact) < 9 {
		return exact
	}
	text := r.FloatString(4)
	if r.Cmp(big.NewRat(1, 10)) < 0 {
		text = r.FloatString(8)
	}
	return "about " + strings.TrimRight(strings.TrimRight(text, "0"), ".")
}

// change is how far rounding moved a value, in words.
func change(percent *big.Rat) string {
	if percent == nil || percent.Sign() == 0 {
		return "nothing lost"
	}
	word := "more"
	if percent.Sign() < 0 {
		word = "less"
	}
	text := new(big.Rat).Abs(percent).FloatString(2)
	text = strings.TrimRight(strings.TrimRight(text, "0"), ".")
	if text == "0" {
		return fmt.Sprintf("under 0.01 %% %s", word)
	}
	return fmt.Sprintf("%s %% %s", text, word)
}
