package main

import (
	"drawup/dilution"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// A shelfJSON is the shelf that the list was planned from.
type shelfJSON struct {
	File     string `json:"file"`
	Name     string `json:"name,omitempty"`
	Invented bool   `json:"invented,omitempty"`
}

// A packJSON is some containers of one presentation.
type packJSON struct {
	Presentation string `json:"presentation"`
	Containers   int    `json:"containers"`
}

func packsOf(m dilution.Mixture) []packJSON {
	out := []packJSON{}
	for _, p := range m.Packs {
		out = append(out, packJSON{p.Presentation.ID, p.Count})
	}
	return out
}

// A fluidJSON is some containers of one fluid, to fetch from the shelf.
type fluidJSON struct {
	Fluid      string        `json:"fluid"`
	Container  string        `json:"container"`
	Volume     *quantityJSON `json:"volume"`
	Containers int           `json:"containers"`
	ForPowder  bool          `json:"for_powder,omitempty"`
}

func fluidPacksOf(s quantity.Style, m dilution.Mixture) []fluidJSON {
	var out []fluidJSON
	for _, f := range m.Fluids {
		out = append(out, fluidJSON{f.Name, f.Container, volumeJSON(s, f.Volume), f.Count, f.ForPowder})
	}
	return out
}

// A choiceJSON is one thing that the planner settled, and why. Alternatives are
// there with --explain.
type choiceJSON struct {
	What         string        `json:"what"`
	Took         string        `json:"took"`
	Why          string        `json:"why"`
	Alternatives []weighedJSON `json:"alternatives,omitempty"`
}

// A weighedJSON is an alternative that lost. Code is that of the refusal, where
// it could not have been made.
type weighedJSON struct {
	Option string `json:"option"`
	Why    string `json:"why"`
	Code   string `json:"code,omitempty"`
}

func choicesOf(list []dilution.Choice) []choiceJSON {
	out := []choiceJSON{}
	for _, c := range list {
		x := choiceJSON{What: c.What, Took: c.Took, Why: c.Why}
		for _, a := range c.Against {
			x.Alternatives = append(x.Alternatives, weighedJSON{a.Option, a.Why, string(a.Code)})
		}
		out = append(out, x)
	}
	return out
}

// A lastsJSON is how long an infusion lasts when what fills the line and what
// stays behind are counted off, and how long it is to last.
type lastsJSON struct {
	UsableMinutes int64         `json:"usable_minutes"`
	WantedMinutes int64         `json:"wanted_minutes,omitempty"`
	Priming       *quantityJSON `json:"priming,omitempty"`
	DeadSpace     *quantityJSON `json:"dead_space,omitempty"`
	Each          *quantityJSON `json:"one_ml_per_hour_gives,omitempty"`
}

func lastsOf(s quantity.Style, part dilution.InfusionPart) lastsJSON {
	out := lastsJSON{UsableMinutes: part.Usable, WantedMinutes: part.Wanted}
	if part.Priming.Given() {
		out.Priming = volumeJSON(s, part.Priming)
	}
	if part.DeadSpace.Given() {
		out.DeadSpace = volumeJSON(s, part.DeadSpace)
	}
	if part.Each.Given() {
		out.Each = doseRateJSON(s, part.Each)
	}
	return out
}

// An insteadJSON is what can be made in place of what is refused, worked in full.
type insteadJSON struct {
	Says             string        `json:"says"`
	Write            []lineJSON    `json:"write"`
	TakeOut          []string      `json:"take_out"`
	Presentation     string        `json:"presentation"`
	Containers       int           `json:"containers"`
	Method           string        `json:"method"`
	Diluent          string        `json:"diluent,omitempty"`
	DrugVolume       *quantityJSON `json:"drug_volume"`
	MeasuringSyringe *quantityJSON `json:"measuring_syringe"`
	DiluentVolume    *quantityJSON `json:"diluent_volume,omitempty"`
	FinalVolume      *quantityJSON `json:"final_volume"`
	GivingSyringe    *quantityJSON `json:"giving_syringe,omitempty"`
	Amount           *quantityJSON `json:"amount"`
	Concentration    *quantityJSON `json:"concentration"`
	DoseVolume       *quantityJSON `json:"dose_volume,omitempty"`
	DoseDelivered    *quantityJSON `json:"dose_delivered,omitempty"`
	PumpRate         *quantityJSON `json:"pump_rate,omitempty"`
}

// A lineJSON is one line of an order.
type lineJSON struct {
	Key   string `json:"key"`
	Value string `json:"value"`
}

func insteadOf(in *refusal.Instead) *insteadJSON {
	if in == nil {
		return nil
	}
	out := &insteadJSON{
		Says: in.Says, Write: []lineJSON{}, TakeOut: []string{}, Presentation: in.Presentation, Containers: in.Containers, Method: in.Method, Diluent: in.Diluent,
		DrugVolume: figureJSON(in.DrugVolume), MeasuringSyringe: figureJSON(in.MeasuringSyringe), DiluentVolume: figureJSON(in.DiluentVolume),
		FinalVolume: figureJSON(in.FinalVolume), GivingSyringe: figureJSON(in.GivingSyringe), Amount: figureJSON(in.Amount),
		Concentration: figureJSON(in.Concentration), DoseVolume: figureJSON(in.DoseVolume), DoseDelivered: figureJSON(in.DoseDelivered),
		PumpRate: figureJSON(in.PumpRate),
	}
	out.TakeOut = append(out.TakeOut, in.TakeOut...)
	for _, l := range in.Write {
		out.Write = append(out.Write, lineJSON{l.Key, l.Value})
	}
	return out
}

func figureJSON(f refusal.Figure) *quantityJSON {
	if !f.Given() {
		return nil
	}
	return &quantityJSON{f.Exact, f.Printed, f.Unit}
}
