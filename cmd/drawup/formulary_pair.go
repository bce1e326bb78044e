package main

import (
	"fmt"
	"io"
	"slices"
	"strings"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// A pairDocument is the answer of formulary pair.
type pairDocument struct {
	Formulary *formularyHead `json:"formulary,omitempty"`
	Drugs     []string       `json:"drugs,omitempty"`
	Use       string         `json:"use,omitempty"`
	Route     string         `json:"route,omitempty"`
	Allowed   *shownPair     `json:"allowed,omitempty"`
	findings
}

// A shownPair is what the record of an allowed pair says.
type shownPair struct {
	Most     *shownFigure `json:"at_most,omitempty"`
	Life     *shownFigure `json:"life,omitempty"`
	Bounds   []shownBound `json:"concentrations"`
	Diluents []shownFluid `json:"diluents"`
	Notes    []shownText  `json:"notes"`
	shownSource
}

type shownBound struct {
	Drug string       `json:"drug"`
	Low  *shownFigure `json:"low,omitempty"`
	High *shownFigure `json:"high,omitempty"`
}

// runFormularyPair says whether two drugs may share a syringe. Silence of the
// formulary is a refusal (rule R10).
func runFormularyPair(e env, r *formularyRequest) int {
	doc := &pairDocument{Use: "bolus", Route: "IV"}
	f, faults := r.open(e)
	if r.use.given {
		doc.Use = r.use.text
	}
	if r.route.given {
		doc.Route = r.route.text
	}
	if doc.Use != "bolus" && doc.Use != "infusion" {
		faults = append(faults, refusal.Reason{Code: refusal.ValueUnknown, Severity: refusal.Refuse, Field: "--use", Got: doc.Use,
			Want: "bolus or infusion", Message: fmt.Sprintf("--use: got %q, want bolus or infusion", doc.Use), Remedy: "write one of the two"})
	}
	if faults.Refused() {
		return finish(e, r.json, doc, nil, faults)
	}
	doc.Formulary = headOf(f)
	names, faults := r.pair(f)
	if faults.Refused() {
		return finish(e, r.json, doc, nil, faults)
	}
	doc.Drugs = names
	mix, reason := f.MayShare(names[0], names[1], doc.Use, doc.Route)
	if reason != nil {
		return finish(e, r.json, doc, nil, refusal.List{*reason})
	}
	doc.Allowed = pairOf(mix)
	return finish(e, r.json, doc, func(w io.Writer) { tellPair(w, doc) }, nil)
}

// pair is the two drugs that were named, as they are filed.
func (r *formularyRequest) pair(f *formulary.Formulary) ([]string, refusal.List) {
	// A drug's own name may hold the word: every place is tried.
	for i, word := range r.words {
		if word != "with" || i == 0 || i == len(r.words)-1 {
			continue
		}
		a, _, okA := f.Find(strings.Join(r.words[:i], " "))
		b, _, okB := f.Find(strings.Join(r.words[i+1:], " "))
		if okA && okB {
			return []string{a.Name, b.Name}, nil
		}
	}
	at := slices.Index(r.words, "with")
	if at <= 0 || at == len(r.words)-1 {
		return nil, refusal.List{{Code: refusal.FlagMissing, Severity: refusal.Refuse, Field: "DRUG", Got: strings.Join(r.words, " "),
			Want: "two drugs with the word with between them", Message: "two drugs are needed, with the word with between them",
			Remedy: "type drawup formulary pair propofol with lidocaine"}}
	}
	var faults refusal.List
	for _, words := range [][]string{r.words[:at], r.words[at+1:]} {
		name := strings.Join(words, " ")
		if _, near, ok := f.Find(name); !ok {
			faults = append(faults, unknownDrug(name, near))
		}
	}
	return nil, faults
}

func pairOf(m formulary.Mix) *shownPair {
	s := quantity.UK()
	out := &shownPair{Bounds: []shownBound{}, Diluents: fluidsOf(s, m.Diluents), Notes: notesOf(m.Notes), shownSource: sourceOf(m.Source, m.Unverified)}
	out.Most = shownOf(m.Most, func(formulary.Proportion) *quantityJSON { return nil })
	out.Life = shownOf(m.Life, noQuantity)
	for _, b := range m.Bounds {
		out.Bounds = append(out.Bounds, shownBound{b.Drug, shownOf(b.Low, concentrationIn(s)), shownOf(b.High, concentrationIn(s))})
	}
	return out
}

func tellPair(w io.Writer, doc *pairDocument) {
	firstLine(w, doc.Formulary)
	p := proof{w}
	p.head("%s with %s may share a syringe, %s, %s", doc.Drugs[0], doc.Drugs[1], doc.Use, doc.Route)
	a := doc.Allowed
	p.sourced("allowed", "by the record", a.shownSource)
	p.figure("at most", a.Most)
	for _, b := range a.Bounds {
		p.item("of "+b.Drug, "in the mixture")
		p.figure("  at least", b.Low)
		p.figure("  at most", b.High)
	}
	for _, d := range a.Diluents {
		p.fluid("diluent", d)
	}
	if len(a.Diluents) == 0 {
		p.item("diluents", "none: the two drugs alone")
	}
	p.figure("life", a.Life)
	for i := range a.Notes {
		p.note("note", &a.Notes[i])
	}
	p.foot()
}
