package formulary

import (
	"fmt"
	"maps"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"time"

	"drawup/dilution/body"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// classes are the label classes of package labels; a test there holds the two
// together.
var classes = []string{
	"IND", "BZD", "BZD-A", "NMB", "SUX", "NMB-R", "OPI", "OPI-A", "VAS", "ADR", "HYP", "LA", "ACH", "AEM",
	"HEP", "PRO", "ACO", "OTH",
}

// flags are the marks a drug may carry.
var flags = []string{
	"high alert", "controlled", "protect from light", "filter needle", "in-line filter", "large vein",
	"central line preferred", "paralysing", "emulsion", "no preservative for neuraxial", "vesicant",
	"separate line", "shake or invert", "keep refrigerated",
}

// containers are what a presentation may come in.
var containers = []string{"ampoule", "vial", "syringe", "bag", "bottle"}

// Flags lists the marks that a drug may carry.
func Flags() []string { return append([]string{}, flags...) }

// exclusions are the kinds of reason why a diluent must not be used.
var exclusions = []string{
	"precipitation", "degradation", "emulsion cracking", "adsorption", "haemolysis", "not listed",
}

// atcPattern is the shape of an ATC code of the fifth level.
var atcPattern = regexp.MustCompile(`^[A-Z]\d{2}[A-Z]{2}\d{2}$`)

// drug reads the i-th drug of the file.
func (r *reader) drug(rec drugRecord, i int) Drug {
	d := Drug{
		Name: rec.Name, names: rec.Names, Also: rec.Also, ATC: rec.ATC, Class: rec.Class,
		CountedAs: rec.CountedAs, ShowAs: rec.ShowAs, Flags: rec.Flags, Origin: r.text.Name, Raw: r.text.Data,
		Formula: rec.Formula, Substitutes: rec.Substitutes, IonsPerFormula: max(1, rec.IonsPerFormula),
		Pos: r.places.Of("drug", i),
	}
	r.identity(&d, rec, i)
	for j := range rec.Cautions {
		d.Cautions = append(d.Cautions, *r.note(&rec.Cautions[j], "drug", i, "caution", j))
	}
	d.NeverAsInfusion = r.note(rec.NoInfusion, "drug", i, "never_as_infusion")
	d.NeverAsBolus = r.note(rec.NoBolus, "drug", i, "never_as_bolus")
	d.Substance = figure(r, rec.Substance, parseFactor, "drug", i, "substance")
	d.Salt = r.salt(rec.Salt, "drug", i, "salt")
	for j, p := range rec.Presentations {
		d.Presentations = append(d.Presentations, r.presentation(p, d.Kind, "drug", i, "presentation", j))
	}
	for j, c := range rec.Concentrations {
		d.Bounds = append(d.Bounds, r.bounds(c, "drug", i, "concentration", j))
	}
	for j, row := range rec.Doses {
		d.Doses = append(d.Doses, r.doseRule(row, "drug", i, "dose", j))
	}
	for j, row := range rec.Infusions {
		d.Rates = append(d.Rates, r.rateRule(row, "drug", i, "infusion", j))
	}
	for j, row := range rec.LocalMaxima {
		d.LocalMaxima = append(d.LocalMaxima, r.localMaximum(row, d.Kind, "drug", i, "local_maximum", j))
	}
	for j, t := range rec.TakenAway {
		d.TakenAway = append(d.TakenAway, r.takenAway(t, "drug", i, "taken_away", j))
	}
	for j, s := range rec.Standards {
		d.Standards = append(d.Standards, r.standard(s, "drug", i, "standard", j))
	}
	for j, s := range rec.Stability {
		d.Stability = append(d.Stability, r.stability(s, "drug", i, "stability", j))
	}
	return d
}

// identity checks the name, code, class, counting and flags of a drug.
func (r *reader) identity(d *Drug, rec drugRecord, i int) {
	if d.Name == "" || d.Name != strings.ToLower(d.Name) {
		r.fault(refusal.KeyMissing, d.Name, "the INN in lower case", "the drug has no name in lower case",
			"drug", i, "name")
	}
	for _, style := range slices.Sorted(maps.Keys(rec.Names)) {
		n := rec.Names[style]
		if _, ok := quantity.StyleNamed(style); !ok {
			r.fault(refusal.ValueUnknown, style, "uk, us or si", "the house style of the name is not known", "drug", i, "names", style)
		} else if n == "" || n == strings.ToUpper(n) {
			r.fault(refusal.ValueUnknown, n, "a name that is not all capitals", "the name on paper is blank or all capitals", "drug", i, "names", style)
		}
	}
	if !atcPattern.MatchString(d.ATC) {
		r.fault(refusal.ValueUnknown, d.ATC, "a code such as N01AX07", "the ATC code has not the shape of one",
			"drug", i, "atc")
	}
	if !contains(classes, d.Class) {
		r.fault(refusal.ValueUnknown, d.Class, strings.Join(classes, ", "), "the label class is not known",
			"drug", i, "class")
	}
	for j, f := range d.Flags {
		if !contains(flags, f) {
			r.fault(refusal.ValueUnknown, f, strings.Join(flags, ", "), "the flag is not known", "drug", i, "flags", j)
		}
	}
	switch rec.Counted {
	case "mass":
		d.Kind = quantity.ByMass
	case "units":
		d.Kind = quantity.ByActivity
	case "substance":
		d.Kind = quantity.BySubstance
	default:
		r.fault(refusal.ValueUnknown, rec.Counted, "mass, units or substance",
			"the file does not say how the drug is counted", "drug", i, "counted")
	}
}

// salt reads the salt of a drug that is counted as its base; nil stays nil.
func (r *reader) salt(rec *saltRecord, path ...any) *Salt {
	if rec == nil {
		return nil
	}
	a, err := quantity.ParseAmount(rec.PerMg)
	if err == nil && a.Kind() != quantity.ByMass {
		err = &quantity.KindError{Got: a.Kind(), Want: quantity.ByMass}
	}
	if err != nil {
		r.badText(rec.PerMg, err, path...)
	}
	if rec.Name == "" {
		r.fault(refusal.KeyMissing, "", "the name of the salt", "the salt has no name", path...)
	}
	s := r.source(rec.Source, path...)
	return &Salt{
		Name: rec.Name, PerMg: a, Formula: rec.Formula, Holds: max(1, rec.Holds),
		Source: s, Unverified: rec.Unverified || s.Grade == "C", Pos: r.places.Of(path...),
	}
}

// parseFactor reads "4 mmol/g".
func parseFactor(s string) (Factor, error) {
	head, ok := strings.CutSuffix(strings.TrimSpace(s), "/g")
	if !ok {
		return Factor{}, fmt.Errorf("got %q, want a factor such as \"4 mmol/g\"", s)
	}
	a, err := quantity.ParseAmount(head)
	if err == nil && a.Kind() != quantity.BySubstance {
		err = &quantity.KindError{Got: a.Kind(), Want: quantity.BySubstance}
	}
	return Factor{PerGram: a}, err
}

// parseMinutes reads "24 h", "30 min" or "7 days" as whole minutes. The number
// is whole: half an hour is 30 min.
func parseMinutes(s string) (int64, error) {
	number, unit, _ := strings.Cut(strings.TrimSpace(s), " ")
	factor := map[string]int64{"min": 1, "h": 60, "hour": 60, "hours": 60, "day": 1440, "days": 1440}[unit]
	most := int64(100 * 365 * 24 * time.Hour / time.Minute)
	n, err := strconv.ParseInt(number, 10, 64)
	if err != nil || number[0] == '+' || factor == 0 || n <= 0 || n > most {
		return 0, fmt.Errorf("got %q, want a time in whole numbers such as \"24 h\" or \"30 min\"", s)
	}
	return n * factor, nil
}

// parseSpan reads a time as a duration.
func parseSpan(s string) (time.Duration, error) {
	m, err := parseMinutes(s)
	return time.Duration(m) * time.Minute, err
}

func (r *reader) presentation(rec presentationRecord, kind quantity.Kind, path ...any) Presentation {
	p := Presentation{
		ID: rec.ID, Container: rec.Container, Form: rec.Form, AddFluids: rec.AddFluids,
		SecondName: rec.SecondName, Uses: rec.Uses, Routes: rec.Routes, Neat: rec.Neat, MultiDose: rec.MultiDose,
		Source: r.source(rec.Source, path...),
		Pos:    r.places.Of(path...),
	}
	p.Unverified = rec.Unverified || p.Source.Grade == "C"
	at := func(key string) []any { return append(append([]any{}, path...), key) }
	if rec.ID == "" || !contains(containers, rec.Container) ||
		!contains([]string{"solution", "emulsion", "powder"}, rec.Form) {
		r.fault(refusal.ValueUnknown, rec.ID+", "+rec.Container+", "+rec.Form,
			"an id, a container (ampoule, vial, syringe, bag, bottle) and a form (solution, emulsion, powder)",
			"the presentation is not described", at("id")...)
	}
	a, err := quantity.ParseAmount(rec.Amount)
	if err == nil && a.Kind() != kind {
		err = &quantity.KindError{Got: a.Kind(), Want: kind}
	}
	if err != nil {
		r.badText(rec.Amount, err, at("amount")...)
	}
	p.Amount = a
	r.contents(&p, rec, at)
	if (rec.SecondName == "") != (rec.SecondAmount == "") {
		r.fault(refusal.KeyMissing, rec.SecondName+" "+rec.SecondAmount, "second_name and second_amount, or neither",
			"the second drug of the container is half described", path...)
	}
	if rec.SecondName != "" && rec.SecondAmount != "" {
		if p.SecondAmount, err = quantity.ParseAmount(rec.SecondAmount); err != nil {
			r.badText(rec.SecondAmount, err, at("second_amount")...)
		}
	}
	p.AgeFrom = r.age(rec.AgeFrom, at("age_from")...)
	p.Assay = figure(r, rec.Assay, quantity.ParsePercent, at("assay")...)
	for _, u := range rec.Uses {
		if u != "bolus" && u != "infusion" {
			r.fault(refusal.ValueUnknown, u, "bolus or infusion", "the use is not known", at("uses")...)
		}
	}
	p.Preserved = r.note(rec.Preserved, at("preserved")...)
	p.NotForPump = r.note(rec.NotForPump, at("not_for_pump")...)
	p.Overfill = figure(r, rec.Overfill, quantity.ParseVolume, at("overfill")...)
	p.Diluents = r.diluents(rec.Diluents, at("diluent"))
	p.Forbidden = r.diluents(rec.Forbidden, at("forbidden_diluent"))
	for j := range rec.Notes {
		p.Notes = append(p.Notes, *r.note(&rec.Notes[j], append(at("note"), j)...))
	}
	return p
}

// contents reads what is in the container: a volume, or a powder with what is
// added to it.
func (r *reader) contents(p *Presentation, rec presentationRecord, at func(string) []any) {
	if !p.Powder() {
		v, err := quantity.ParseVolume(rec.Volume)
		if err != nil {
			r.badText(rec.Volume, err, at("volume")...)
		}
		if rec.Add != "" || rec.Displacement != nil || len(rec.AddFluids) > 0 {
			r.fault(refusal.KeyConflict, rec.Form, "a powder, or none of add, add_fluids and displacement",
				"what is no powder is not mixed", at("form")...)
		}
		p.Volume = v
		return
	}
	added, err := quantity.ParseVolume(rec.Add)
	if err != nil {
		r.badText(rec.Add, err, at("add")...)
		return
	}
	p.Added = added
	if rec.Volume != "" {
		v, err := quantity.ParseVolume(rec.Volume)
		if err != nil {
			r.badText(rec.Volume, err, at("volume")...)
		}
		if rec.Displacement != nil {
			r.fault(refusal.KeyConflict, rec.Volume, "the volume that is obtained, or the displacement",
				"a powder has both a volume after mixing and a displacement", at("volume")...)
		}
		p.Volume, p.Obtained = v, true
		return
	}
	if rec.Displacement == nil {
		return
	}
	if rec.Displacement.Value == "negligible" {
		s := r.source(rec.Displacement.Source, at("displacement")...)
		p.Displacement = Figure[quantity.Volume]{
			Text: "negligible", Source: s, Unverified: rec.Displacement.Unverified || s.Grade == "C",
			Jurisdiction: s.Jurisdiction, Pos: r.places.Of(at("displacement")...),
		}
		p.Negligible, p.Volume = true, added
		return
	}
	p.Displacement = figure(r, rec.Displacement, quantity.ParseVolume, at("displacement")...)
	if p.Displacement.Value.Given() {
		p.Volume = added.Plus(p.Displacement.Value)
	}
}

func (r *reader) diluents(list []diluentRecord, path []any) []Diluent {
	var out []Diluent
	for j, d := range list {
		at := func(keys ...any) []any { return append(append(append([]any{}, path...), j), keys...) }
		if d.Name == "" {
			r.fault(refusal.KeyMissing, "", "the name of a fluid", "a diluent has no name", at()...)
		}
		if d.Why != "" && !contains(exclusions, d.Why) {
			r.fault(refusal.ValueUnknown, d.Why, strings.Join(exclusions, ", "),
				"the kind of exclusion is not known", at("why")...)
		}
		s := r.source(d.Source, at()...)
		out = append(out, Diluent{
			Name: d.Name, Why: d.Why, Reason: d.Reason,
			Low:    figure(r, d.Low, quantity.ParseConcentration, at("low")...),
			High:   figure(r, d.High, quantity.ParseConcentration, at("high")...),
			Source: s, Unverified: d.Unverified || s.Grade == "C", Pos: r.places.Of(at()...),
		})
	}
	return out
}

func (r *reader) bounds(rec concentrationRecord, path ...any) Bounds {
	at := func(key string) []any { return append(append([]any{}, path...), key) }
	b := Bounds{Use: rec.Use, Line: rec.Line, Routes: rec.Routes, For: rec.For, Pos: r.places.Of(path...),
		AgeFrom: r.age(rec.AgeFrom, at("age_from")...), AgeTo: r.age(rec.AgeTo, at("age_to")...),
		Low:  figure(r, rec.Low, quantity.ParseConcentration, at("low")...),
		High: figure(r, rec.High, quantity.ParseConcentration, at("high")...)}
	if !contains([]string{"bolus", "infusion"}, b.Use) || !contains([]string{"any", "peripheral", "central"}, b.Line) {
		r.fault(refusal.ValueUnknown, b.Use+", "+b.Line, "use bolus or infusion; line any, peripheral or central",
			"the row does not say what it is for", path...)
	}
	r.ageOrder(b.AgeFrom, b.AgeTo, path)
	if b.Low.Given() && b.High.Given() {
		if n, err := b.Low.Value.Cmp(b.High.Value); err != nil || n > 0 {
			r.fault(refusal.KeyConflict, b.Low.Text+" to "+b.High.Text, "low not above high, counted the same way",
				"the bounds are out of order", path...)
		}
	}
	return b
}

func (r *reader) standard(rec standardRecord, path ...any) Standard {
	a, v, err := quantity.ParseMix(rec.Mix)
	if err != nil {
		r.badText(rec.Mix, err, append(append([]any{}, path...), "mix")...)
	}
	s := r.source(rec.Source, path...)
	return Standard{
		ID: rec.ID, Mix: rec.Mix, Amount: a, Volume: v, Diluent: rec.Diluent, Line: rec.Line, Patients: rec.Patients,
		Jurisdiction: rec.Jurisdiction, Source: s, Unverified: rec.Unverified || s.Grade == "C",
		Pos: r.places.Of(path...),
	}
}

func (r *reader) stability(rec stabilityRecord, path ...any) Stability {
	m, err := parseMinutes(rec.Hours)
	if err != nil {
		r.fault(refusal.TimeMalformed, rec.Hours, `a time such as "24 h"`, err.Error(),
			append(append([]any{}, path...), "hours")...)
	}
	s := r.source(rec.Source, path...)
	return Stability{
		Diluent: rec.Diluent, Storage: rec.Storage, Container: rec.Container,
		Low:     figure(r, rec.Low, quantity.ParseConcentration, append(append([]any{}, path...), "low")...),
		High:    figure(r, rec.High, quantity.ParseConcentration, append(append([]any{}, path...), "high")...),
		Minutes: m, Text: rec.Hours, Source: s,
		Unverified: rec.Unverified || s.Grade == "C", Pos: r.places.Of(path...),
	}
}

// ageText reads an age bound; blank is no bound.
func (r *reader) age(s string, path ...any) body.Age {
	if s == "" {
		return body.Age{}
	}
	a, err := body.ParseAge(s)
	if err != nil {
		r.badText(s, err, path...)
	}
	return a
}
