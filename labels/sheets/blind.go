package sheets

import (
	"math/big"
	"strings"

	"drawup/dilution"
	"drawup/dilution/body"
	"drawup/dilution/quantity"
	"drawup/labels"
)

// CheckSheets is two sheets for each syringe of the list, in making order: the
// blind page for the second person, then the preparer's figures and working.
// Facts has one entry a plan, in the order of list.Plans.
func CheckSheets(list dilution.List, facts []labels.Facts, m labels.Making) []Sheet {
	var out []Sheet
	for _, s := range scribesOf(list, facts, PaperCheck) {
		out = append(out,
			Sheet{Paper: PaperCheck, Size: A4, Title: "Check sheet: the second person", Note: s.numbered(), Of: s.of(),
				Bookmark: s.of() + ", second person", Syringe: s.p.Number, Foot: footSaying(list, m), Parts: s.blindParts()},
			Sheet{Paper: PaperCheck, Size: A4, Title: "Check sheet: the preparer's figures", Note: "open only after the page before is filled in", Of: s.of(),
				Bookmark: s.of() + ", preparer", Syringe: s.p.Number, Foot: footSaying(list, m), Parts: s.openParts(list)})
	}
	return out
}

// blindParts is the page of the second person. It takes nothing from the
// facts: only what was typed, what stands on the container, and empty boxes.
func (s scribe) blindParts() []Part {
	n := s.p.Number
	return []Part{
		{n, []Block{s.name(nil, nil, false),
			Words{Line: labels.Words("Work alone and work it out yourself. Do not ask for the preparer's figures, and do not open the next page before this one is filled in."), Strong: true}}},
		{n, []Block{Beside{LeftShare: 50,
			Left:  []Block{heading("The order, as typed, in house style"), Pairs{List: s.ordered()}},
			Right: []Block{heading("The patient, as typed, in house style"), Pairs{List: s.body()}, heading("The container, as its label should read"), Pairs{List: s.pack()}}}}},
		{n, []Block{heading("What you read"), Boxes{s.readBoxes()}}},
		{n, []Block{heading("What you work out"), Boxes{s.workBoxes()}}},
		{n, []Block{Beside{LeftShare: 50,
			Left: []Block{heading("What you see"), Ticks{s.looks()}},
			Right: []Block{heading("Only now open the next page"), Words{Line: labels.Words("Compare line by line."), Small: true},
				Ticks{[]string{"all lines agree", "a line differs: STOP, do not give it, and let a third person settle it"}}}},
			Sign{[]string{"second person, name", "date and time", "third person, where a line differed"}}}},
	}
}

// ordered is the order's own words.
func (s scribe) ordered() []Pair {
	o := s.p.Order
	var out []Pair
	add := func(key, text string) {
		if text != "" {
			out = append(out, words(key, text))
		}
	}
	add("drug", o.Drug.Text)
	add("presentation", s.typed(o.Presentation.Text))
	add("indication", o.Indication.Text)
	add("dose", s.typed(o.Dose.Text))
	add("amount", s.typed(o.Amount.Text))
	add("concentration", s.typed(o.Concentration.Text))
	add("volume", s.typed(o.Volume.Text))
	add("doses", s.typed(o.Doses.Text))
	add("dilute if needed", yes(o.Dilute.Value))
	add("standard", s.typed(o.Standard.Text))
	add("mix", s.typed(mixText(s.p)))
	add("method", o.Method.Text)
	add("diluent", o.Diluent.Text)
	add("route", o.Route.Text)
	add("line", o.Line.Text)
	add("start", s.typed(o.Start.Text))
	add("from", s.typed(o.From.Text))
	add("to", s.typed(o.To.Text))
	add("to last", s.typed(o.Hours.Text))
	add("fills the line", s.typed(o.Priming.Text))
	add("stays behind", s.typed(o.DeadSpace.Text))
	add("mixture", o.Mixture.Text)
	add("each mL/h gives", s.typed(o.Each.Text))
	add("syringe size", s.typed(o.Size.Text))
	add("batch", o.Batch.Text)
	add("expiry", o.Expiry.Text)
	return append(out, s.given()...)
}

// given is what the planner chose and the second person cannot work out from the
// order: it is taken as ordered.
func (s scribe) given() []Pair {
	var out []Pair
	if s.p.Order.Dilute.Value && s.p.Settled.Concentration.Given() {
		out = append(out, pair("chosen, not ordered", s.say("dilute to {concentration}, {final.volume} in all")))
	}
	if o := s.p.Settled; o.Infusion && o.Standard.Given() && !s.p.Order.Standard.Given() {
		out = append(out, pair("chosen, not ordered", s.said(o.Standard.Value)))
	}
	return out
}

func yes(b bool) string {
	if b {
		return "yes"
	}
	return ""
}

// mixText is a mixture as typed, "4 mg in 50 mL".
func mixText(p dilution.Plan) string {
	a, v := p.Order.MixAmount.Text, p.Order.MixVolume.Text
	if a == "" || v == "" || a == v {
		return a
	}
	return a + " in " + v
}

// body is the patient as typed.
func (s scribe) body() []Pair {
	p := s.p.Patient
	out := []Pair{words("id", p.ID.Text)}
	add := func(key, text string) {
		if text != "" {
			out = append(out, words(key, text))
		}
	}
	add("name", p.Name.Text)
	add("sex", p.Sex.Text)
	age := p.Age.Text
	if p.Frail {
		age = strings.TrimPrefix(age+", frail", ", ")
	}
	add("age", age)
	add("height", s.typed(p.Height.Text))
	weight := s.typed(p.Weight.Text)
	if weight != "" && p.Estimated {
		weight += ", an estimate"
	}
	add("weight", weight)
	add("weighed", p.Weighed.Text)
	return out
}

// pack is the container in the words of the formulary.
func (s scribe) pack() []Pair {
	var out []Pair
	for _, pack := range s.p.Mixture.Packs {
		out = append(out, pair("container", joined(labels.Words(s.drug()+", "), s.said(pack.Presentation.ID))))
	}
	if s.p.Presentation.Powder() {
		out = append(out, words("form", "powder: read on the pack what to add and what it gives"))
	}
	return out
}

// readBoxes are what the second person reads off pack and syringe.
func (s scribe) readBoxes() []Box {
	amount := s.unit(s.p.Presentation.Amount.Unit())
	out := []Box{{Label: "drug name on the container"}, {Label: "strength on it", Unit: amount + " in ____ mL"},
		{Label: "containers opened", Unit: s.p.Presentation.Container + "s"}, {Label: "lot"}, {Label: "expiry"}}
	if s.p.Presentation.Powder() {
		out = append(out, Box{Label: "fluid added to each", Unit: "mL"})
	}
	out = append(out, Box{Label: "volume drawn", Unit: "mL"})
	if s.p.Mixture.Method != dilution.Neat {
		out = append(out, Box{Label: "diluent"}, Box{Label: "diluent volume", Unit: "mL"})
	}
	final := "final volume on the scale"
	if s.bag() {
		final = "final volume in the bag"
	}
	return append(out, Box{Label: final, Unit: "mL"})
}

// workBoxes are what the second person works out.
func (s scribe) workBoxes() []Box {
	amount := s.unit(s.p.Presentation.Amount.Unit())
	out := []Box{{Label: "drug volume it takes", Unit: "mL"}, {Label: "amount in it", Unit: amount}, {Label: "concentration", Unit: amount + "/mL"}}
	if second := s.p.Presentation.SecondAmount; second.Given() {
		out = append(out, Box{Label: s.p.Presentation.SecondName + ", concentration", Unit: s.unit(second.Unit()) + "/mL"})
	}
	if d := s.p.Dose; d != nil {
		out = append(scalarBox(d.By, d.Surface.Given(), d.Weight.Given()), out...)
		out = append(out, Box{Label: "one dose, amount", Unit: s.unit(d.Ordered.Unit())}, Box{Label: "one dose, volume", Unit: "mL"})
	}
	if i := s.p.Infusion; i != nil {
		out = append(scalarBox(i.By, i.Surface.Given(), i.Weight.Given()), out...)
		out = append(out, Box{Label: "pump rate for the start", Unit: "mL/h"}, Box{Label: "back: the dose rate it gives", Unit: s.rateUnit(i.Start.Dose)})
	}
	return append(out, Box{Label: "use by, on the label"})
}

// scalarBox asks for the weight or surface that the order goes by.
func scalarBox(by body.Kind, surface, weight bool) []Box {
	switch {
	case surface:
		return []Box{{Label: "body surface", Unit: "m²"}}
	case weight:
		return []Box{{Label: by.String() + " weight", Unit: "kg"}}
	}
	return nil
}

// unit is a unit in the words of the house style, in the plural.
func (s scribe) unit(u quantity.Unit) string {
	text := s.p.Style.AmountIn(quantity.AmountOf(big.NewRat(2, 1), u), u)
	return strings.TrimPrefix(text, "2 ")
}

// rateUnit is the unit of a dose rate in the words of the house style.
func (s scribe) rateUnit(d quantity.DoseRate) string {
	_, unit, _ := strings.Cut(s.p.Style.DoseRate(d), " ")
	return unit
}

// looks are what is checked by eye and aloud.
func (s scribe) looks() []string {
	look := "the content is clear, without particles"
	if s.p.Presentation.Form == "emulsion" {
		look = "the content is even and white, nothing has separated"
	}
	onRight := "the label is on the right syringe, and the scale can be read"
	if s.bag() {
		onRight = "the label is on the right bag, and its own print can be read"
	}
	out := []string{"label read aloud against the " + s.p.Presentation.Container + ": drug, concentration, use-by", look,
		onRight, "the patient on the order is the patient on the label"}
	if s.p.Infusion != nil {
		out = append(out, "the pump shows drug, concentration, weight and dose rate of the order")
	}
	return out
}
