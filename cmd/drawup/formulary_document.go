package main

import (
	"fmt"
	"strings"
	"time"

	"drawup/dilution/body"
	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/labels"
)

// A drugsDocument is the answer of formulary list. It and the next are stable:
// keys are added, never renamed or given another meaning. The text for people is
// written from them, so that both say the same.
type drugsDocument struct {
	Formulary *formularyHead `json:"formulary,omitempty"`
	Drugs     []listedDrug   `json:"drugs"`
	findings
}

// A drugDocument is the answer of formulary show.
type drugDocument struct {
	Formulary *formularyHead `json:"formulary,omitempty"`
	Drug      *shownDrug     `json:"drug,omitempty"`
	Pairs     []shownText    `json:"pairs"`
	findings
}

// A formularyHead says which data this is, and whether anybody approved it.
type formularyHead struct {
	State   string `json:"state"`
	Name    string `json:"name"`
	Version string `json:"version"`
	Digest  string `json:"digest"` // SHA-256 of all files
}

// A listedDrug is one line of formulary list.
type listedDrug struct {
	Name      string   `json:"name"`
	Also      []string `json:"also"`
	Class     string   `json:"class"`
	ClassWord string   `json:"class_word"`
	Flags     []string `json:"flags"`
}

// A shownSource is where a figure or sentence comes from, spelled out.
type shownSource struct {
	Source       string `json:"source"`
	Grade        string `json:"grade"` // A, B, C, or P for common practice without a source
	Key          string `json:"source_key"`
	Jurisdiction string `json:"source_jurisdiction,omitempty"`
	Unverified   bool   `json:"unverified"`
	VerifiedBy   string `json:"verified_by"` // "" in the starter: nobody
	Reason       string `json:"loosened_because,omitempty"`
}

// A shownText is a sentence or a name with its source.
type shownText struct {
	Text   string `json:"text"`
	Reason string `json:"reason,omitempty"`
	shownSource
}

// A shownFigure is one figure: as the file has it, and as the program read it.
// Quantity is left out where the file has a word ("negligible").
type shownFigure struct {
	Text     string        `json:"text"`
	Quantity *quantityJSON `json:"quantity,omitempty"`
	shownSource
}

// A shownDrug is everything that the formulary holds of one drug.
type shownDrug struct {
	listedDrug
	From            string              `json:"formulary"` // whose record this is
	File            string              `json:"file"`
	Line            int                 `json:"line"`
	LabelNames      map[string]string   `json:"label_names"` // by house style
	ATC             string              `json:"atc"`
	Counted         string              `json:"counted"`
	CountedAs       string              `json:"counted_as"`
	ShowAs          bool                `json:"counted_as_on_labels"`
	Salt            *shownSalt          `json:"salt,omitempty"`
	Formula         string              `json:"formula,omitempty"`
	Substitutes     []string            `json:"substitutes,omitempty"`
	Substance       *shownFigure        `json:"substance_per_gram,omitempty"`
	Cautions        []shownText         `json:"drug_cautions"`
	NeverAsBolus    *shownText          `json:"never_as_bolus,omitempty"`
	NeverAsInfusion *shownText          `json:"never_as_infusion,omitempty"`
	Presentations   []shownPresentation `json:"presentations"`
	Concentrations  []shownBounds       `json:"concentrations"`
	Doses           []shownRule         `json:"doses"`
	Infusions       []shownRule         `json:"infusions"`
	LocalMaxima     []shownLocal        `json:"local_anaesthetic_maxima,omitempty"`
	Standards       []shownStandard     `json:"standards"`
	Stability       []shownStability    `json:"stability"`
}

type shownSalt struct {
	Name    string        `json:"name"`
	PerMg   *quantityJSON `json:"per_mg"`
	Formula string        `json:"formula,omitempty"`
	shownSource
}

// A shownPresentation is an ampoule, vial or syringe as supplied.
type shownPresentation struct {
	ID            string        `json:"id"`
	Container     string        `json:"container"`
	Form          string        `json:"form"`
	Amount        *quantityJSON `json:"amount"`
	Volume        *quantityJSON `json:"volume,omitempty"`
	Concentration *quantityJSON `json:"concentration,omitempty"`
	Added         *quantityJSON `json:"added,omitempty"`
	AddFluids     []string      `json:"add_fluids,omitempty"`
	Displacement  *shownFigure  `json:"displacement,omitempty"`
	SecondName    string        `json:"second_name,omitempty"`
	SecondAmount  *quantityJSON `json:"second_amount,omitempty"`
	Assay         *shownFigure  `json:"assay,omitempty"`
	AgeFrom       string        `json:"age_from,omitempty"`
	Uses          []string      `json:"uses"`
	Routes        []string      `json:"routes,omitempty"`
	Neat          bool          `json:"neat"`
	MultiDose     bool          `json:"multi_dose,omitempty"`
	Preserved     *shownText    `json:"preserved,omitempty"`
	NotForPump    *shownText    `json:"not_for_pump,omitempty"`
	Overfill      *shownFigure  `json:"overfill,omitempty"`
	Diluents      []shownFluid  `json:"diluents"`
	Forbidden     []shownFluid  `json:"forbidden_diluents"`
	Notes         []shownText   `json:"notes"`
	shownSource
}

// A shownFluid is a diluent, allowed or forbidden.
type shownFluid struct {
	Text   string       `json:"text"`
	Why    string       `json:"why,omitempty"`
	Reason string       `json:"reason,omitempty"`
	Low    *shownFigure `json:"from_concentration,omitempty"`
	High   *shownFigure `json:"up_to_concentration,omitempty"`
	shownSource
}

type shownBounds struct {
	Use    string       `json:"use"`
	Line   string       `json:"line"`
	Routes []string     `json:"routes,omitempty"`
	Whom   string       `json:"for,omitempty"` // indication and ages
	Low    *shownFigure `json:"low,omitempty"`
	High   *shownFigure `json:"high,omitempty"`
}

// A shownLocal is a maximum of a local anaesthetic.
type shownLocal struct {
	WithAdrenaline bool         `json:"with_adrenaline"`
	Ages           string       `json:"ages"`
	By             string       `json:"by"`
	BySource       *shownSource `json:"by_source,omitempty"`
	PerKg          *shownFigure `json:"per_kg,omitempty"`
	Total          *shownFigure `json:"total,omitempty"`
	DayMax         *shownFigure `json:"day_max,omitempty"`
}

// A shownRule is one row of dose or rate limits. What is left out is not in the
// file, and refused where it would be needed.
type shownRule struct {
	For       string       `json:"for"`
	Routes    []string     `json:"routes"`
	Ages      string       `json:"ages"` // "" for every age
	By        string       `json:"by"`
	BySource  *shownSource `json:"by_source,omitempty"`
	HardLow   *shownFigure `json:"hard_low,omitempty"`
	UsualLow  *shownFigure `json:"usual_low,omitempty"`
	UsualHigh *shownFigure `json:"usual_high,omitempty"`
	SoftHigh  *shownFigure `json:"soft_high,omitempty"`
	HardHigh  *shownFigure `json:"hard_high,omitempty"`
	TotalMax  *shownFigure `json:"total_max,omitempty"`

	FirstMax    *shownFigure `json:"first_max,omitempty"`
	RepeatMax   *shownFigure `json:"repeat_max,omitempty"`
	RepeatAfter *shownFigure `json:"repeat_after,omitempty"`
	DayMax      *shownFigure `json:"day_max,omitempty"`
	CourseMax   *shownFigure `json:"course_max,omitempty"`
	Longest     *shownFigure `json:"longest,omitempty"`
}

type shownStandard struct {
	ID            string        `json:"id"`
	Amount        *quantityJSON `json:"amount"`
	Volume        *quantityJSON `json:"volume"`
	Concentration *quantityJSON `json:"concentration,omitempty"`
	Diluent       string        `json:"diluent"` // "" when neat
	Line          string        `json:"line"`
	Patients      string        `json:"patients,omitempty"`
	SettledFor    string        `json:"jurisdiction"`
	shownSource
}

type shownStability struct {
	Diluent string `json:"diluent"`
	Storage string `json:"storage"`

	Container string       `json:"container,omitempty"`
	Low       *shownFigure `json:"from_concentration,omitempty"`
	High      *shownFigure `json:"up_to_concentration,omitempty"`

	Time    string `json:"time"`
	Minutes int64  `json:"minutes"`
	shownSource
}

func headOf(f *formulary.Formulary) *formularyHead {
	return &formularyHead{State: f.State(), Name: f.Name, Version: f.Version, Digest: f.Digest}
}

// sourceOf is s spelled out. Whatever the file says, a weak source and common
// practice without a source verify nothing (rule R13).
func sourceOf(s formulary.Source, unverified bool) shownSource {
	return shownSource{Source: s.Title, Grade: s.Grade, Key: s.Key, Jurisdiction: s.Jurisdiction,
		Unverified: unverified || s.Grade == "C" || s.Grade == "P"}
}

func listedOf(d formulary.Drug) listedDrug {
	c, _ := labels.ClassOf(d.Class) // the formulary reader knows the same codes; a word that is absent stays ""
	return listedDrug{Name: d.Name, Also: whole(d.Also), Class: d.Class, ClassWord: c.Word, Flags: whole(d.Flags)}
}

// whole is a list that a document shows as [] when it is empty.
func whole(list []string) []string { return append([]string{}, list...) }

// drugOf is all of d, quantities in the number style s.
func drugOf(s quantity.Style, d formulary.Drug) *shownDrug {
	out := &shownDrug{listedDrug: listedOf(d), File: d.Pos.File, Line: d.Pos.Line, From: d.From, Formula: d.Formula, Substitutes: d.Substitutes, ATC: d.ATC, Counted: d.Kind.String(), CountedAs: d.CountedAs, ShowAs: d.ShowAs,
		LabelNames:      map[string]string{},
		Substance:       shownOf(d.Substance, func(f formulary.Factor) *quantityJSON { return amountJSON(s, f.PerGram) }),
		Cautions:        notesOf(d.Cautions),
		NeverAsBolus:    noteOf(d.NeverAsBolus),
		NeverAsInfusion: noteOf(d.NeverAsInfusion),
		Presentations:   []shownPresentation{}, Concentrations: []shownBounds{}, Standards: []shownStandard{}, Stability: []shownStability{},
		Doses:     rulesOf(d.Doses, s, func(x quantity.Dose) *quantityJSON { return doseJSON(s, x) }),
		Infusions: rulesOf(d.Rates, s, func(x quantity.DoseRate) *quantityJSON { return doseRateJSON(s, x) })}
	for _, style := range []quantity.Style{quantity.UK(), quantity.US(), quantity.SI()} {
		out.LabelNames[style.String()] = d.LabelName(style)
	}
	if d.Salt != nil {
		out.Salt = &shownSalt{d.Salt.Name, amountJSON(s, d.Salt.PerMg), d.Salt.Formula, sourceOf(d.Salt.Source, d.Salt.Unverified)}
	}
	for _, p := range d.Presentations {
		out.Presentations = append(out.Presentations, presentationOf(s, p))
	}
	dose := func(x quantity.Dose) *quantityJSON { return doseJSON(s, x) }
	strength := func(c quantity.Concentration) *quantityJSON { return concentrationJSON(s, c) }
	for _, b := range d.Bounds {
		out.Concentrations = append(out.Concentrations, shownBounds{b.Use, b.Line, b.Routes, b.Whom(), shownOf(b.Low, strength), shownOf(b.High, strength)})
	}
	for _, m := range d.LocalMaxima {
		out.LocalMaxima = append(out.LocalMaxima, shownLocal{m.WithAdrenaline, formulary.Rule[quantity.Dose]{AgeFrom: m.AgeFrom, AgeTo: m.AgeTo}.Ages(), m.By.String(),
			weightSource(m.By, m.BySource), shownOf(m.PerKg, dose), shownOf(m.Total, func(a quantity.Amount) *quantityJSON { return amountJSON(s, a) }), shownOf(m.DayMax, dose)})
	}
	for _, x := range d.Standards {
		out.Standards = append(out.Standards, shownStandard{x.ID, amountJSON(s, x.Amount), volumeJSON(s, x.Volume), strengthOf(s, x.Amount, x.Volume),
			x.Diluent, x.Line, x.Patients, x.Jurisdiction, sourceOf(x.Source, x.Unverified)})
	}
	for _, x := range d.Stability {
		out.Stability = append(out.Stability, shownStability{x.Diluent, x.Storage, x.Container, shownOf(x.Low, strength), shownOf(x.High, strength),
			x.Text, x.Minutes, sourceOf(x.Source, x.Unverified)})
	}
	return out
}

func presentationOf(s quantity.Style, p formulary.Presentation) shownPresentation {
	out := shownPresentation{ID: p.ID, Container: p.Container, Form: p.Form, Amount: amountJSON(s, p.Amount), AddFluids: p.AddFluids,
		Displacement: shownOf(p.Displacement, func(v quantity.Volume) *quantityJSON { return ifGiven(v.Given(), volumeJSON(s, v)) }),
		SecondName:   p.SecondName,
		Assay:        shownOf(p.Assay, func(x quantity.Percent) *quantityJSON { return percentJSON(s, x) }),
		Uses:         whole(p.Uses), Routes: p.Routes, Neat: p.Neat, MultiDose: p.MultiDose, Preserved: noteOf(p.Preserved), NotForPump: noteOf(p.NotForPump),
		Overfill: shownOf(p.Overfill, func(v quantity.Volume) *quantityJSON { return volumeJSON(s, v) }),
		Diluents: fluidsOf(s, p.Diluents), Forbidden: fluidsOf(s, p.Forbidden), Notes: notesOf(p.Notes),
		shownSource: sourceOf(p.Source, p.Unverified)}
	if p.Volume.Given() {
		out.Volume, out.Concentration = volumeJSON(s, p.Volume), strengthOf(s, p.Amount, p.Volume)
	}
	if p.AgeFrom.Given() {
		out.AgeFrom = p.AgeFrom.String()
	}
	if p.Added.Given() {
		out.Added = volumeJSON(s, p.Added)
	}
	if p.SecondName != "" {
		out.SecondAmount = amountJSON(s, p.SecondAmount)
	}
	return out
}

// noQuantity is for figures that are no quantity of the quick sums: times.
func noQuantity(time.Duration) *quantityJSON { return nil }

func concentrationIn(s quantity.Style) func(quantity.Concentration) *quantityJSON {
	return func(c quantity.Concentration) *quantityJSON { return concentrationJSON(s, c) }
}

func ifGiven(given bool, q *quantityJSON) *quantityJSON {
	if given {
		return q
	}
	return nil
}

// strengthOf is the concentration of a in v; nil when there is none.
func strengthOf(s quantity.Style, a quantity.Amount, v quantity.Volume) *quantityJSON {
	c, err := a.In(v)
	if err != nil {
		return nil
	}
	return concentrationJSON(s, c)
}

// shownOf is f with its value as read; nil when the file does not have it.
func shownOf[T any](f formulary.Figure[T], value func(T) *quantityJSON) *shownFigure {
	if !f.Given() {
		return nil
	}
	out := &shownFigure{f.Text, value(f.Value), sourceOf(f.Source, f.Unverified)}
	out.Jurisdiction, out.VerifiedBy, out.Reason = f.Jurisdiction, f.VerifiedBy, f.Reason
	out.Unverified = out.Unverified && f.VerifiedBy == ""
	return out
}

func rulesOf[T any](list []formulary.Rule[T], s quantity.Style, value func(T) *quantityJSON) []shownRule {
	out := []shownRule{}
	dose := func(x quantity.Dose) *quantityJSON { return doseJSON(s, x) }
	for _, r := range list {
		row := shownRule{For: r.For, Routes: whole(r.Routes), Ages: r.Ages(), By: r.By.String(),
			HardLow: shownOf(r.HardLow, value), UsualLow: shownOf(r.UsualLow, value), UsualHigh: shownOf(r.UsualHigh, value),
			SoftHigh: shownOf(r.SoftHigh, value), HardHigh: shownOf(r.HardHigh, value),
			TotalMax:    shownOf(r.TotalMax, func(a quantity.Amount) *quantityJSON { return amountJSON(s, a) }),
			FirstMax:    shownOf(r.FirstMax, value),
			RepeatMax:   shownOf(r.RepeatMax, value),
			RepeatAfter: shownOf(r.RepeatAfter, noQuantity),
			DayMax:      shownOf(r.DayMax, dose),
			CourseMax:   shownOf(r.CourseMax, dose),
			Longest:     shownOf(r.Longest, noQuantity)}
		row.BySource = weightSource(r.By, r.BySource)
		out = append(out, row)
	}
	return out
}

// weightSource is where it says which weight a row goes by; nil for a row that
// goes by none and names no source.
func weightSource(by body.Kind, s formulary.Source) *shownSource {
	switch {
	case s.Key != "":
		source := sourceOf(s, false)
		return &source
	case by != body.None:
		return &shownSource{Source: "no source given", Unverified: true}
	}
	return nil
}

func noteOf(n *formulary.Note) *shownText {
	if n == nil {
		return nil
	}
	return &shownText{Text: n.Text, shownSource: sourceOf(n.Source, n.Unverified)}
}

func notesOf(list []formulary.Note) []shownText {
	out := []shownText{}
	for i := range list {
		out = append(out, *noteOf(&list[i]))
	}
	return out
}

func fluidsOf(s quantity.Style, list []formulary.Diluent) []shownFluid {
	out := []shownFluid{}
	strength := func(c quantity.Concentration) *quantityJSON { return concentrationJSON(s, c) }
	for _, d := range list {
		out = append(out, shownFluid{d.Name, d.Why, d.Reason, shownOf(d.Low, strength), shownOf(d.High, strength), sourceOf(d.Source, d.Unverified)})
	}
	return out
}

// pairsOf is what the formulary says of the drug with another in one syringe.
func pairsOf(f *formulary.Formulary, drug string) []shownText {
	out := []shownText{}
	for _, m := range f.Mixes {
		if m.Drugs[0] != drug && m.Drugs[1] != drug {
			continue
		}
		text := fmt.Sprintf("%s with %s, %s, %s", m.Drugs[0], m.Drugs[1], m.Use, strings.Join(m.Routes, ", "))
		if m.Most.Given() {
			text += "; at most " + m.Most.Text
		}
		if m.Life.Given() {
			text += "; for " + m.Life.Text
		}
		out = append(out, shownText{Text: text, Reason: "allowed", shownSource: sourceOf(m.Source, m.Unverified)})
	}
	for _, n := range f.Never {
		if n.Drugs[0] == drug || n.Drugs[1] == drug {
			out = append(out, shownText{Text: n.Drugs[0] + " with " + n.Drugs[1] + ": " + n.Reason, Reason: "never", shownSource: sourceOf(n.Source, n.Unverified)})
		}
	}
	return out
}
