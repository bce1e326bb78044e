// Package formulary reads, checks and looks up the drug data: presentations,
// diluents, concentration bounds, dose and rate limits, standard preparations,
// stability. Every figure carries its source; a figure that nobody has
// verified is marked so (rule R13). Blank means refuse (rule R10).
//
// The starter formulary is embedded here. It is not approved for use anywhere.
package formulary

import (
	"sort"
	"strings"
	"time"

	"drawup/dilution/body"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// A Source is where a figure comes from.
type Source struct {
	Key          string // as in the file
	Title        string // spelled out
	Grade        string // A, B, C, or P for common practice without a source
	Jurisdiction string // "UK", "US" …, "international"; "" when the file does not say
}

// A Figure is one figure with its source and place. Text is as written.
type Figure[T any] struct {
	Value        T
	Text         string
	Source       Source
	Jurisdiction string // of the figure, else of its source
	Unverified   bool
	VerifiedBy   string // who held it against the source, and when; "" in the starter
	Reason       string // in a site's file: why it is looser than the base
	Pos          refusal.Pos
}

// Given reports whether the file has the figure at all.
func (f Figure[T]) Given() bool { return f.Text != "" }

// A Note is a sentence with its source.
type Note struct {
	Text       string
	Source     Source
	Unverified bool
	Pos        refusal.Pos
}

// A Drug is one substance, in one salt where the salt matters.
type Drug struct {
	Name            string // INN or the name under which it is filed
	names           map[string]string
	Also            []string
	ATC             string
	Class           string // label class code
	Kind            quantity.Kind
	CountedAs       string // what the amount refers to: "base"
	ShowAs          bool   // print CountedAs on the label
	Flags           []string
	Cautions        []Note
	NeverAsInfusion *Note
	NeverAsBolus    *Note
	Formula         string   // chemical, of what is counted; "" when not stored
	Substitutes     []string // names of drugs that a refusal may point to
	Substance       Figure[Factor]
	IonsPerFormula  int64 // of the ion that Substance counts; 1 unless the file says more
	Salt            *Salt
	Presentations   []Presentation
	Bounds          []Bounds
	Doses           []Rule[quantity.Dose]
	Rates           []Rule[quantity.DoseRate]
	LocalMaxima     []LocalMaximum
	Standards       []Standard
	Stability       []Stability
	TakenAway       []TakenAway
	Origin          string // name of the file that holds it
	From            string // name and version of the formulary that holds it
	Raw             []byte // that file, for the second route
	Pos             refusal.Pos
}

// A Factor converts this drug's mass to amount of substance, mmol per g.
type Factor struct{ PerGram quantity.Amount }

// A Salt is what the pack holds where the drug is counted as something else:
// PerMg of it for each mg as counted.
type Salt struct {
	Name       string
	PerMg      quantity.Amount
	Formula    string // chemical, its parts parted by points
	Holds      int64  // molecules of what is counted in one formula
	Source     Source
	Unverified bool
	Pos        refusal.Pos
}

// A Presentation is an ampoule, vial or syringe as supplied.
type Presentation struct {
	ID           string
	Container    string // ampoule, vial, syringe, bag, bottle
	Form         string // solution, emulsion, powder
	Amount       quantity.Amount
	Volume       quantity.Volume // of a powder: volume after mixing, not given when unknown
	Added        quantity.Volume // powder: fluid added
	AddFluids    []string
	Displacement Figure[quantity.Volume] // powder; Value not given when negligible
	Negligible   bool                    // the record says so, with a source (rule R7)
	Obtained     bool                    // powder: Volume is what the label says is obtained
	SecondName   string
	SecondAmount quantity.Amount
	Assay        Figure[quantity.Percent]
	Source       Source
	Unverified   bool
	AgeFrom      body.Age // not for younger patients; not given: no bound
	Uses         []string // bolus, infusion
	Routes       []string // that it is bound to; none: as the rows of limits say
	Neat         bool
	MultiDose    bool
	Preserved    *Note // never epidural or intrathecal
	NotForPump   *Note
	Overfill     Figure[quantity.Volume] // a note, never counted
	Diluents     []Diluent
	Forbidden    []Diluent
	Notes        []Note
	Pos          refusal.Pos
}

// Powder reports whether it has to be mixed before it can be drawn.
func (p Presentation) Powder() bool { return p.Form == "powder" }

// For reports whether it may be used for "bolus" or "infusion".
func (p Presentation) For(use string) bool { return contains(p.Uses, use) }

// A Diluent is a fluid that may, or may not, be used with a presentation.
type Diluent struct {
	Name       string
	Why        string // kind of the exclusion: precipitation, degradation …
	Reason     string // the exclusion in a sentence
	Low, High  Figure[quantity.Concentration]
	Source     Source
	Unverified bool
	Pos        refusal.Pos
}

// Bounds are the concentrations that a syringe may hold.
type Bounds struct {
	Use    string   // bolus, infusion
	Line   string   // any, peripheral, central
	Routes []string // none: every route that no other row of this use names
	For    string   // indication; "": every one that no other row names
	// AgeFrom and AgeTo bound the ages; neither given: every age.
	AgeFrom, AgeTo body.Age
	Low            Figure[quantity.Concentration]
	High           Figure[quantity.Concentration]
	Pos            refusal.Pos
}

// Special counts what makes the row special: a route, an indication, an age.
// Of rows that fit, the most special ones hold.
func (b Bounds) Special() int {
	n := 0
	for _, is := range []bool{len(b.Routes) > 0, b.For != "", b.AgeFrom.Given() || b.AgeTo.Given()} {
		if is {
			n++
		}
	}
	return n
}

// Fits reports whether the row is for this route, indication and age.
func (b Bounds) Fits(route, purpose string, age body.Age) bool {
	ages := Rule[quantity.Dose]{AgeFrom: b.AgeFrom, AgeTo: b.AgeTo}
	return (len(b.Routes) == 0 || contains(b.Routes, route)) && (b.For == "" || b.For == purpose) && ages.Fits(age)
}

// Whom is the row's indication and ages in words, "" when it has none.
func (b Bounds) Whom() string {
	return strings.Trim(b.For+", "+Rule[quantity.Dose]{AgeFrom: b.AgeFrom, AgeTo: b.AgeTo}.Ages(), ", ")
}

// A Rule is one row of dose limits, for boluses in doses, for infusions in
// dose rates. Absent figures are not given.
type Rule[T any] struct {
	For       string
	Routes    []string
	AgeFrom   body.Age // not given: from birth
	AgeTo     body.Age // not included; not given: no end
	Frail     bool     // for the frail alone
	By        body.Kind
	BySource  Source
	HardLow   Figure[T]
	UsualLow  Figure[T]
	UsualHigh Figure[T]
	SoftHigh  Figure[T]
	HardHigh  Figure[T]
	TotalMax  Figure[quantity.Amount] // boluses only: in one dose
	FirstMax  Figure[T]               // boluses only: the first dose
	RepeatMax Figure[T]               // boluses only: each later one

	RepeatAfter Figure[time.Duration] // boluses only
	DayMax      Figure[quantity.Dose] // all doses in 24 hours
	CourseMax   Figure[quantity.Dose] // all doses together
	Longest     Figure[time.Duration] // infusions only
	Pos         refusal.Pos
}

// Fits reports whether the rule covers a patient of this age. A rule without
// age bounds covers all; an age that is not given fits only those.
func (r Rule[T]) Fits(age body.Age) bool {
	if !r.AgeFrom.Given() && !r.AgeTo.Given() {
		return true
	}
	if !age.Given() {
		return false
	}
	return (!r.AgeFrom.Given() || !age.Less(r.AgeFrom)) && (!r.AgeTo.Given() || age.Less(r.AgeTo))
}

// Ages is the band in words, "from 18 years", "" when unbounded.
func (r Rule[T]) Ages() string {
	var parts []string
	if r.AgeFrom.Given() {
		parts = append(parts, "from "+r.AgeFrom.String())
	}
	if r.AgeTo.Given() {
		parts = append(parts, "under "+r.AgeTo.String())
	}
	if r.Frail {
		parts = append(parts, "the frail")
	}
	return strings.Join(parts, ", ")
}

// A Standard is a concentration that a list or a site has settled.
type Standard struct {
	ID           string
	Mix          string // as written
	Amount       quantity.Amount
	Volume       quantity.Volume
	Diluent      string // "" when neat
	Line         string
	Patients     string // adults, children, newborns; "" when the list does not say
	Jurisdiction string
	Source       Source
	Unverified   bool
	Pos          refusal.Pos
}

// A Stability is how long a preparation may be kept.
type Stability struct {
	Diluent    string // a diluent, "neat" or "any"
	Storage    string // room, refrigerator
	Container  string // syringe, bag, glass; "": any
	Low, High  Figure[quantity.Concentration]
	Minutes    int64
	Text       string
	Source     Source
	Unverified bool
	Pos        refusal.Pos
}

// A Formulary is a set of drugs with a name, a version and a digest.
type Formulary struct {
	Name    string
	Version string
	Digest  string // SHA-256 of all files, hexadecimal
	Base    string // name and version of the formulary that this one builds on; "" for none
	Mixes   []Mix
	Never   []NeverMix
	TallMan []TallMan

	drugs    []Drug
	approval *Approval // nil when nobody approved it
	basePos  refusal.Pos
	lapsed   string // why an approval that was given does not hold
}

// Drugs is all drugs in order of name.
func (f *Formulary) Drugs() []Drug { return f.drugs }

// LabelName is the name that paper of this style prints, in lower case.
func (d Drug) LabelName(style quantity.Style) string {
	if n, ok := d.names[style.String()]; ok {
		return n
	}
	return d.Name
}

// Has reports a flag such as "high alert".
func (d Drug) Has(flag string) bool { return contains(d.Flags, flag) }

// Presentation finds a presentation by its identifier.
func (d Drug) Presentation(id string) (Presentation, bool) {
	for _, p := range d.Presentations {
		if strings.EqualFold(p.ID, strings.TrimSpace(id)) {
			return p, true
		}
	}
	return Presentation{}, false
}

// Standard finds a standard preparation by its identifier.
func (d Drug) Standard(id string) (Standard, bool) {
	for _, s := range d.Standards {
		if strings.EqualFold(s.ID, strings.TrimSpace(id)) {
			return s, true
		}
	}
	return Standard{}, false
}

// Find looks a drug up by any of its names, in any case. When there is none
// it returns the names that look most alike.
func (f *Formulary) Find(name string) (Drug, []string, bool) {
	want := strings.ToLower(strings.TrimSpace(name))
	for _, d := range f.drugs {
		if d.called(want) {
			return d, nil, true
		}
	}
	return Drug{}, f.near(want), false
}

func (d Drug) called(want string) bool {
	if d.Name == want || contains(d.Also, want) {
		return true
	}
	for _, n := range d.names {
		if n == want {
			return true
		}
	}
	return false
}

// near is at most three names within a third of the letters, nearest first.
func (f *Formulary) near(want string) []string {
	type match struct {
		name string
		far  int
	}
	var found []match
	for _, d := range f.drugs {
		for _, n := range append([]string{d.Name}, d.Also...) {
			far := distance(want, n)
			if far <= max(2, len(n)/3) {
				found = append(found, match{n, far})
			}
		}
	}
	sort.SliceStable(found, func(i, j int) bool { return found[i].far < found[j].far })
	var names []string
	for _, m := range found {
		if len(names) < 3 && !contains(names, m.name) {
			names = append(names, m.name)
		}
	}
	return names
}

// distance counts the letters to change, add or drop (Levenshtein).
func distance(a, b string) int {
	row := make([]int, len(b)+1)
	for j := range row {
		row[j] = j
	}
	for i := 1; i <= len(a); i++ {
		diag := row[0]
		row[0] = i
		for j := 1; j <= len(b); j++ {
			cost := diag
			if a[i-1] != b[j-1] {
				cost++
			}
			diag = row[j]
			row[j] = min(cost, row[j]+1, row[j-1]+1)
		}
	}
	return row[len(b)]
}

func contains(list []string, s string) bool {
	for _, x := range list {
		if x == s {
			return true
		}
	}
	return false
}

// allNames is every name that finds the drug, each once.
func (d Drug) allNames() []string {
	out := append([]string{d.Name}, d.Also...)
	for _, style := range []string{"uk", "us", "si"} {
		if n := d.names[style]; n != "" && !contains(out, n) {
			out = append(out, n)
		}
	}
	return out
}
