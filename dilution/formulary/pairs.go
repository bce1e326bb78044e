package formulary

import (
	"fmt"
	"regexp"
	"slices"
	"strings"
	"time"

	"drawup/dilution/body"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// A Mix is two drugs that may share one syringe, with the limits under which
// they may. What no Mix names is refused (rule R10).
type Mix struct {
	Drugs      [2]string // the one that leads first
	Use        string    // bolus, infusion
	Routes     []string
	Most       Figure[Proportion] // of the second for so much of the first
	Bounds     []MixBound
	Diluents   []Diluent
	Life       Figure[time.Duration]
	Notes      []Note
	Source     Source
	Unverified bool
	Pos        refusal.Pos
}

// A Proportion is at most Second for First: "20 mg per 200 mg".
type Proportion struct{ Second, First quantity.Amount }

// A MixBound bounds one drug of a mix.
type MixBound struct {
	Drug      string
	Low, High Figure[quantity.Concentration]
}

// A NeverMix is two drugs that must never share a syringe.
type NeverMix struct {
	Drugs      [2]string
	Reason     string
	Source     Source
	Unverified bool
	Pos        refusal.Pos
}

// TallMan is one list of names with confusable letters in capitals. The names
// are used as the list has them, never made by a rule.
type TallMan struct {
	Jurisdiction string
	Names        []string
	Source       Source
	Pos          refusal.Pos
}

// Of is the list's form of a name, "" when it has none. Names are compared
// whole and in any case.
func (t TallMan) Of(name string) string {
	for _, n := range t.Names {
		if strings.EqualFold(n, name) {
			return n
		}
	}
	return ""
}

// A LocalMaximum is a maximum of a local anaesthetic. Fractions of maxima add
// up across drugs and sites and must not pass one.
type LocalMaximum struct {
	WithAdrenaline bool
	AgeFrom, AgeTo body.Age
	By             body.Kind
	BySource       Source
	PerKg          Figure[quantity.Dose]
	Total          Figure[quantity.Amount]
	DayMax         Figure[quantity.Dose]
	Pos            refusal.Pos
}

// Fits reports whether the maximum covers a patient of this age.
func (m LocalMaximum) Fits(age body.Age) bool {
	return Rule[quantity.Dose]{AgeFrom: m.AgeFrom, AgeTo: m.AgeTo}.Fits(age)
}

// TakenAway says why a limit of the base is gone in a site's file.
type TakenAway struct {
	Limit  string // as Compare names it
	Reason string
	Source Source
	Pos    refusal.Pos
}

// Pair finds the mix of two drugs, in either order, for a use and a route.
func (f *Formulary) Pair(a, b, use, route string) (Mix, bool) {
	for _, m := range f.Mixes {
		if sameTwo(m.Drugs, a, b) && m.Use == use && contains(m.Routes, route) {
			return m, true
		}
	}
	return Mix{}, false
}

// Forbidden finds the record that keeps two drugs apart.
func (f *Formulary) Forbidden(a, b string) (NeverMix, bool) {
	for _, n := range f.Never {
		if sameTwo(n.Drugs, a, b) {
			return n, true
		}
	}
	return NeverMix{}, false
}

// MayShare says whether two drugs may share a syringe: the record that allows
// it, or the reason why not. A pair that the formulary keeps apart is refused,
// and so is one that it does not name (rule R10).
func (f *Formulary) MayShare(a, b, use, route string) (Mix, *refusal.Reason) {
	two := a + " with " + b
	if n, never := f.Forbidden(a, b); never {
		return Mix{}, &refusal.Reason{Code: refusal.PairNever, Severity: refusal.Refuse, Field: "drugs", Got: two,
			Want: "two syringes", Rule: "R11", Source: n.Source.Title,
			Message: fmt.Sprintf("%s and %s must never share a syringe: %s", a, b, n.Reason),
			Remedy:  "make two syringes; no setting passes this limit"}
	}
	if m, ok := f.Pair(a, b, use, route); ok {
		return m, nil
	}
	r := &refusal.Reason{Code: refusal.PairNotListed, Severity: refusal.Refuse, Field: "drugs", Got: two,
		Want: "a pair that the formulary allows", Rule: "R10",
		Message: fmt.Sprintf("the formulary does not allow %s and %s in one syringe, %s, %s", a, b, use, route),
		Remedy:  "make two syringes, or add the pair with its limit and source to the formulary (whoever keeps it does that)"}
	if with := f.Partners(a); len(with) > 0 {
		r.Want = a + " with " + strings.Join(with, " or ")
	}
	return Mix{}, r
}

// Partners are the drugs that may share a syringe with this one.
func (f *Formulary) Partners(name string) []string {
	var out []string
	for _, m := range f.Mixes {
		for i, d := range m.Drugs {
			if d == name && !contains(out, m.Drugs[1-i]) {
				out = append(out, m.Drugs[1-i])
			}
		}
	}
	return out
}

func sameTwo(two [2]string, a, b string) bool {
	return two == [2]string{a, b} || two == [2]string{b, a}
}

// readPairs reads what a file says of two drugs at once, and its tall-man list.
func (r *reader) readPairs(f *Formulary, rec fileRecord) {
	for i, m := range rec.Mixes {
		f.Mixes = append(f.Mixes, r.mix(m, i))
	}
	for i, n := range rec.NeverMixes {
		s := r.source(n.Source, "never_mix", i, "source")
		if n.Reason == "" {
			r.fault(refusal.KeyMissing, "", "why the two must not meet", "the record gives no reason",
				"never_mix", i, "reason")
		}
		f.Never = append(f.Never, NeverMix{Drugs: r.two(n.Drugs, "never_mix", i), Reason: n.Reason, Source: s,
			Unverified: n.Unverified || s.Grade == "C", Pos: r.places.Of("never_mix", i)})
	}
	for i, t := range rec.TallMan {
		f.TallMan = append(f.TallMan, r.tallMan(t, i))
	}
}

// two wants the names of two different drugs.
func (r *reader) two(names []string, path ...any) [2]string {
	if len(names) != 2 || names[0] == names[1] {
		r.fault(refusal.KeyMissing, strings.Join(names, ", "), "two different drugs",
			"the record does not name two drugs", append(path, "drugs")...)
		return [2]string{}
	}
	return [2]string{names[0], names[1]}
}

func (r *reader) mix(rec mixRecord, i int) Mix {
	at := func(keys ...any) []any { return append([]any{"mix", i}, keys...) }
	m := Mix{Drugs: r.two(rec.Drugs, "mix", i), Use: rec.Use, Routes: rec.Routes, Pos: r.places.Of("mix", i)}
	if !contains([]string{"bolus", "infusion"}, rec.Use) || len(rec.Routes) == 0 {
		r.fault(refusal.ValueUnknown, rec.Use, "use bolus or infusion, and at least one route",
			"the record does not say what the mixture is for", at()...)
	}
	m.Source = r.source(rec.Source, at("source")...)
	m.Unverified = rec.Unverified || m.Source.Grade == "C"
	m.Most = figure(r, rec.Most, parseProportion, at("most")...)
	m.Life = figure(r, rec.Life, parseSpan, at("life")...)
	m.Diluents = r.diluents(rec.Diluents, at("diluent"))
	for j, b := range rec.Bounds {
		if !contains(rec.Drugs, b.Drug) {
			r.fault(refusal.ValueUnknown, b.Drug, strings.Join(rec.Drugs, " or "),
				"the bound names a drug that is not in the mixture", at("bound", j)...)
		}
		m.Bounds = append(m.Bounds, MixBound{Drug: b.Drug,
			Low:  figure(r, b.Low, quantity.ParseConcentration, at("bound", j, "low")...),
			High: figure(r, b.High, quantity.ParseConcentration, at("bound", j, "high")...)})
	}
	for j := range rec.Notes {
		m.Notes = append(m.Notes, *r.note(&rec.Notes[j], at("note", j)...))
	}
	return m
}

// parseProportion reads "20 mg per 200 mg".
func parseProportion(s string) (Proportion, error) {
	second, first, ok := strings.Cut(s, " per ")
	if !ok {
		return Proportion{}, fmt.Errorf("got %q, want a proportion such as \"20 mg per 200 mg\"", s)
	}
	a, err := quantity.ParseAmount(second)
	if err != nil {
		return Proportion{}, err
	}
	b, err := quantity.ParseAmount(first)
	return Proportion{Second: a, First: b}, err
}

// letters is a name of a list: letters, blanks and hyphens.
var letters = regexp.MustCompile(`^[A-Za-z]+([ -][A-Za-z]+)*$`)

// tallMan reads a list of names. A name that is all capitals is none (label
// rule I-15), nor one that repeats.
func (r *reader) tallMan(rec tallManRecord, i int) TallMan {
	t := TallMan{Jurisdiction: rec.Jurisdiction, Names: rec.Names, Pos: r.places.Of("tall_man", i),
		Source: r.source(rec.Source, "tall_man", i, "source")}
	if !jurisdictionPattern.MatchString(rec.Jurisdiction) {
		r.fault(refusal.ValueUnknown, rec.Jurisdiction, `two capital letters such as "US"`,
			"the list does not say whose it is", "tall_man", i, "jurisdiction")
	}
	seen := map[string]bool{}
	for j, n := range rec.Names {
		low := strings.ToLower(n)
		if !letters.MatchString(n) || n == strings.ToUpper(n) || n == low || seen[low] {
			r.fault(refusal.ValueUnknown, n, "a name in small letters with some capitals, once in the list",
				"the name has no tall-man form", "tall_man", i, "names", j)
		}
		seen[low] = true
	}
	return t
}

func (r *reader) localMaximum(rec localMaximumRecord, kind quantity.Kind, path ...any) LocalMaximum {
	at := func(key string) []any { return append(append([]any{}, path...), key) }
	m := LocalMaximum{WithAdrenaline: rec.WithAdrenaline, Pos: r.places.Of(path...),
		AgeFrom: r.age(rec.AgeFrom, at("age_from")...), AgeTo: r.age(rec.AgeTo, at("age_to")...),
		PerKg:  figure(r, rec.PerKg, quantity.ParseDose, at("per_kg")...),
		Total:  figure(r, rec.Total, quantity.ParseAmount, at("total")...),
		DayMax: figure(r, rec.DayMax, quantity.ParseDose, at("day_max")...)}
	m.By, m.BySource = r.scalar(rec.By, rec.BySource, at("by"))
	r.ageOrder(m.AgeFrom, m.AgeTo, path)
	if !m.PerKg.Given() && !m.Total.Given() {
		r.fault(refusal.KeyMissing, "", "per_kg or total", "the maximum has no figure", path...)
	}
	if m.Total.Given() && m.Total.Value.Given() && m.Total.Value.Kind() != kind {
		r.badText(rec.Total.Value, &quantity.KindError{Got: m.Total.Value.Kind(), Want: kind}, at("total")...)
	}
	return m
}

func (r *reader) takenAway(rec takenAwayRecord, path ...any) TakenAway {
	if rec.Limit == "" || rec.Reason == "" {
		r.fault(refusal.KeyMissing, rec.Limit, "the limit as drawup formulary compare names it, and why it is gone",
			"the record does not say what is taken away, or why", path...)
	}
	return TakenAway{Limit: rec.Limit, Reason: rec.Reason, Source: r.source(rec.Source, path...), Pos: r.places.Of(path...)}
}

// pairFaults finds pairs and substitutes that name a drug which is not there,
// pairs that are both allowed and forbidden, and substitutes that lead back to
// where they began.
func pairFaults(f *Formulary) refusal.List {
	var out refusal.List
	fault := func(code refusal.Code, pos refusal.Pos, field, got, want, message string) {
		out = append(out, refusal.Reason{Code: code, Severity: refusal.Refuse, Field: field, Got: got, Want: want,
			Rule: "R10", Pos: pos, Message: message, Remedy: "mend the formulary file"})
	}
	known := map[string]Drug{}
	for _, d := range f.drugs {
		known[d.Name] = d
	}
	unknown := func(pos refusal.Pos, field, name string) {
		if _, ok := known[name]; !ok && name != "" {
			fault(refusal.ValueUnknown, pos, field, name, "the name of a drug in this formulary, as it is filed",
				fmt.Sprintf("%q is not a drug of this formulary", name))
		}
	}
	for _, m := range f.Mixes {
		unknown(m.Pos, "mix.drugs", m.Drugs[0])
		unknown(m.Pos, "mix.drugs", m.Drugs[1])
		if _, never := f.Forbidden(m.Drugs[0], m.Drugs[1]); never {
			fault(refusal.KeyConflict, m.Pos, "mix.drugs", strings.Join(m.Drugs[:], " with "), "allowed or forbidden",
				"the two drugs are allowed in one syringe and forbidden")
		}
	}
	for _, n := range f.Never {
		unknown(n.Pos, "never_mix.drugs", n.Drugs[0])
		unknown(n.Pos, "never_mix.drugs", n.Drugs[1])
	}
	for _, d := range f.drugs {
		for _, s := range d.Substitutes {
			unknown(d.Pos, "substitutes", s)
		}
		if ring := circle(known, d.Name, nil); ring != nil {
			fault(refusal.KeyConflict, d.Pos, "substitutes", strings.Join(ring, " → "), "substitutes that come to an end",
				"the substitutes lead in a circle")
		}
	}
	return out
}

// circle is the way from name back to its beginning over the substitutes, nil
// when there is none. It is reported once, at the first name of the alphabet.
func circle(known map[string]Drug, name string, way []string) []string {
	if len(way) > 0 && name == way[0] {
		return append(way, name)
	}
	if slices.Contains(way, name) || len(way) > 0 && name < way[0] {
		return nil
	}
	for _, next := range known[name].Substitutes {
		if ring := circle(known, next, append(slices.Clone(way), name)); ring != nil {
			return ring
		}
	}
	return nil
}
