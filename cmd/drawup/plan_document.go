package main

import (
	"fmt"
	"path/filepath"
	"time"

	"drawup/dilution"
	"drawup/dilution/pump"
	"drawup/dilution/quantity"
	"drawup/labels"
)

// A planDocument is plan.json: one order, worked. It is stable: keys are added,
// never renamed or given another meaning.
type planDocument struct {
	Order     string         `json:"order,omitempty"`
	Place     string         `json:"place,omitempty"`
	Prepared  string         `json:"prepared,omitempty"`
	Preparer  string         `json:"preparer,omitempty"`
	Invented  bool           `json:"invented,omitempty"`
	Formulary *formularyJSON `json:"formulary,omitempty"`
	Shelf     *shelfJSON     `json:"shelf,omitempty"`
	Digest    string         `json:"digest,omitempty"`
	Syringes  []syringeJSON  `json:"syringes"`
	LeftOut   []leftOutJSON  `json:"left_out,omitempty"`
	findings
}

type formularyJSON struct {
	Name   string `json:"name"`
	Digest string `json:"digest"`
	State  string `json:"state"`
}

type leftOutJSON struct {
	Number  int          `json:"number"`
	Drug    string       `json:"drug"`
	Reasons []reasonJSON `json:"reasons"`
}

// A syringeJSON is one syringe, in making order.
type syringeJSON struct {
	Number        int           `json:"number"`
	Patient       string        `json:"patient"`
	Drug          string        `json:"drug"`
	ATC           string        `json:"atc"`
	Class         string        `json:"class"`
	Presentation  string        `json:"presentation"`
	Route         string        `json:"route"`
	Method        string        `json:"method"`
	Diluent       string        `json:"diluent,omitempty"`
	MixedWith     string        `json:"mixed_with,omitempty"`
	Containers    int           `json:"containers"`
	Strength      *quantityJSON `json:"strength"`
	DrugVolume    *quantityJSON `json:"drug_volume"`
	DiluentVolume *quantityJSON `json:"diluent_volume,omitempty"`
	FinalVolume   *quantityJSON `json:"final_volume"`
	Amount        *quantityJSON `json:"amount"`
	Concentration *quantityJSON `json:"concentration"`
	Substance     *quantityJSON `json:"amount_of_substance,omitempty"`
	Second        *secondJSON   `json:"second_drug,omitempty"`
	Interval      intervalPlan  `json:"interval"`
	LeftVolume    *quantityJSON `json:"left_volume"`
	LeftAmount    *quantityJSON `json:"left_amount"`
	Dose          *dosePlan     `json:"dose,omitempty"`
	Infusion      *infusionPlan `json:"infusion,omitempty"`
	UseBy         useByPlan     `json:"use_by"`
	Opened        []packJSON    `json:"opened"`
	Fluids        []fluidJSON   `json:"diluent_containers,omitempty"`
	Doses         int           `json:"doses,omitempty"`
	Choices       []choiceJSON  `json:"choices"`
	Serial        string        `json:"serial"`
	Code          string        `json:"code"`  // the shortest form of the barcode
	Codes         []string      `json:"codes"` // all forms, the fullest first; the label has one of them
	Cautions      []reasonJSON  `json:"cautions"`
}

type secondJSON struct {
	Name          string        `json:"name"`
	Amount        *quantityJSON `json:"amount"`
	Concentration *quantityJSON `json:"concentration"`
}

type intervalPlan struct {
	Percent *quantityJSON `json:"percent"`
	Low     *quantityJSON `json:"low"`
	High    *quantityJSON `json:"high"`
}

type dosePlan struct {
	Ordered   *quantityJSON `json:"ordered"`
	WeightBy  string        `json:"weight_by"`
	Weight    *quantityJSON `json:"weight,omitempty"`
	Amount    *quantityJSON `json:"amount"`
	Volume    *quantityJSON `json:"volume"`
	Delivered *quantityJSON `json:"delivered"`
	CheckedBy string        `json:"checked_against"`
}

type infusionPlan struct {
	Standard   string        `json:"standard,omitempty"`
	WeightBy   string        `json:"weight_by"`
	Weight     *quantityJSON `json:"weight,omitempty"`
	Step       *quantityJSON `json:"pump_step"`
	Start      settingJSON   `json:"start"`
	Low        settingJSON   `json:"low"`
	High       settingJSON   `json:"high"`
	Limit      *settingJSON  `json:"hard_limit,omitempty"`
	Ladder     []settingJSON `json:"ladder"`
	Slips      []slipJSON    `json:"slips"`
	RunMinutes int64         `json:"run_minutes"`
	lastsJSON
	CheckedBy string `json:"checked_against"`
}

type settingJSON struct {
	DoseRate  *quantityJSON `json:"dose_rate"`
	FlowRate  *quantityJSON `json:"flow_rate"`
	PumpRate  *quantityJSON `json:"pump_rate"`
	Delivered *quantityJSON `json:"delivered_dose_rate"`
}

type slipJSON struct {
	Kind     string        `json:"kind"`
	PumpRate *quantityJSON `json:"pump_rate"`
}

type useByPlan struct {
	At      string `json:"at"`
	Minutes int64  `json:"minutes"`
	Won     string `json:"won"`
	Source  string `json:"source"`
}

// planOf is the document of a job; the caller adds the cautions.
func planOf(j *job) *planDocument {
	m := j.making
	doc := &planDocument{
		Order: filepath.Base(j.file), Place: m.Place, Prepared: j.list.At.Format(time.RFC3339),
		Preparer: m.Preparer, Invented: m.Invented,
		Formulary: &formularyJSON{m.Formulary, j.list.Formulary.Digest, m.State},
		Digest:    m.Digest, Syringes: []syringeJSON{},
	}
	if j.shelf != nil {
		doc.Shelf = &shelfJSON{filepath.Base(j.shelf.File), j.shelf.Name.Value, j.shelf.Invented}
	}
	for i, p := range j.list.Plans {
		doc.Syringes = append(doc.Syringes, syringePlan(p, m.SerialOf(p.Number), j.labels[i].Codes))
	}
	for _, l := range j.list.LeftOut {
		doc.LeftOut = append(doc.LeftOut, leftOutJSON{l.Number, l.Drug, reasonsJSON(l.Reasons)})
	}
	return doc
}

func syringePlan(p dilution.Plan, serial string, codes []labels.Cell) syringeJSON {
	s, m := p.Style, p.Mixture
	out := syringeJSON{
		Number: p.Number, Patient: p.Patient.ID.Value, Drug: p.Name, ATC: p.Drug.ATC,
		Class: p.Drug.Class, Presentation: p.Presentation.ID, Route: p.Route, Method: m.Method.String(),
		Diluent: m.Diluent, MixedWith: m.AddFluid, Containers: m.Containers,
		Strength: concentrationJSON(s, m.Strength), DrugVolume: volumeJSON(s, m.DrugVolume),
		FinalVolume: volumeJSON(s, m.FinalVolume), Amount: amountJSON(s, m.Amount),
		Concentration: concentrationJSON(s, m.Concentration),
		Interval: intervalPlan{
			percentJSON(s, m.Interval), concentrationJSON(s, m.Low), concentrationJSON(s, m.High),
		},
		LeftVolume: volumeJSON(s, m.LeftVolume), LeftAmount: amountJSON(s, m.LeftAmount),
		UseBy:  useByPlan{p.UseBy.At.Format(time.RFC3339), p.UseBy.Minutes, p.UseBy.Won, p.UseBy.Source},
		Opened: packsOf(m), Fluids: fluidPacksOf(s, m), Doses: p.Order.Doses.Value, Choices: choicesOf(p.Choices),
		Serial: serial, Cautions: reasonsJSON(p.Cautions),
	}
	for _, code := range codes {
		out.Codes, out.Code = append(out.Codes, code.Text), code.Text
	}
	if m.DiluentVolume.Given() {
		out.DiluentVolume = volumeJSON(s, m.DiluentVolume)
	}
	if m.Substance.Given() {
		out.Substance = amountJSON(s, m.Substance)
	}
	if m.SecondAmount.Given() {
		out.Second = &secondJSON{
			p.Presentation.SecondName, amountJSON(s, m.SecondAmount), concentrationJSON(s, m.SecondConc),
		}
	}
	if p.Dose != nil {
		out.Dose = doseOf(s, *p.Dose)
	}
	if p.Infusion != nil {
		out.Infusion = infusionOf(s, p)
	}
	return out
}

func doseOf(s quantity.Style, d dilution.DosePart) *dosePlan {
	return &dosePlan{
		Ordered: doseJSON(s, d.Ordered), WeightBy: d.By.String(), Weight: scalarJSON(s, d.Weight, d.Surface),
		Amount: amountJSON(s, d.Amount), Volume: volumeJSON(s, d.Volume),
		Delivered: amountJSON(s, d.Delivered), CheckedBy: rowText(d.Rule.For, d.Rule.Ages()),
	}
}

func rowText(purpose, ages string) string {
	if ages == "" {
		return purpose
	}
	return fmt.Sprintf("%s, %s", purpose, ages)
}

func doseJSON(s quantity.Style, d quantity.Dose) *quantityJSON {
	return &quantityJSON{d.Exact(), s.Dose(d), d.Unit().String() + plainBasis(d.Basis())}
}

func scalarJSON(s quantity.Style, w quantity.BodyWeight, a quantity.BodySurfaceArea) *quantityJSON {
	switch {
	case w.Given():
		return bodyWeightJSON(s, w)
	case a.Given():
		return surfaceJSON(s, a)
	}
	return nil
}

func infusionOf(s quantity.Style, p dilution.Plan) *infusionPlan {
	part := p.Infusion
	out := &infusionPlan{
		Standard: p.Standard, WeightBy: part.By.String(), Weight: scalarJSON(s, part.Weight, part.Surface),
		Step: flowRateJSON(s, part.Step), Start: settingOf(s, part.Start), Low: settingOf(s, part.Low),
		High: settingOf(s, part.High), RunMinutes: part.Minutes, lastsJSON: lastsOf(s, *part),
		CheckedBy: rowText(part.Rule.For, part.Rule.Ages()),
	}
	if part.Limit.Dose.Given() {
		limit := settingOf(s, part.Limit)
		out.Limit = &limit
	}
	for _, rung := range part.Ladder {
		out.Ladder = append(out.Ladder, settingOf(s, rung))
	}
	for _, slip := range part.Slips {
		out.Slips = append(out.Slips, slipJSON{slip.Kind, flowRateJSON(s, slip.Rate)})
	}
	return out
}

func settingOf(s quantity.Style, x pump.Setting) settingJSON {
	return settingJSON{
		doseRateJSON(s, x.Dose), flowRateJSON(s, x.Exact),
		flowRateJSON(s, x.Rate), doseRateJSON(s, x.Delivered),
	}
}
