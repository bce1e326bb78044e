package order

import (
	"fmt"

	"drawup/dilution/body"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// patient reads one patient with all syringes and infusions.
func (r *reader) patient(i int, p patientRecord) {
	path := []any{"patient", i}
	out := Patient{
		ID:        r.text(p.ID, at(path, "id")),
		Name:      r.text(p.Name, at(path, "name")),
		Sex:       read(r, p.Sex, parseSex, at(path, "sex")),
		Age:       read(r, p.Age, body.ParseAge, at(path, "age")),
		Height:    read(r, p.Height, quantity.ParseLength, at(path, "height")),
		Weight:    read(r, p.Weight, quantity.ParseBodyWeight, at(path, "weight")),
		Weighed:   r.text(r.loose(p.Weighed, at(path, "weighed")), at(path, "weighed")),
		Estimated: p.Estimated,
		Frail:     p.Frail,
		Pos:       r.places.Of(path...),
	}
	r.required(out.ID.Given(), path, "id", fmt.Sprintf("patient %d of the order", i+1), `id = "A"`)
	if out.ID.Given() && r.ids[out.ID.Value] {
		r.refuse(at(path, "id"), refusal.Reason{Code: refusal.KeyRepeated, Got: out.ID.Text, Want: "another id for each patient",
			Message: fmt.Sprintf("two patients of the order have the id %q", out.ID.Value), Remedy: "give each patient an id of its own, and put all syringes of one patient under one [[patient]]"})
	}
	r.ids[out.ID.Value] = true
	r.plausible(path, out)
	r.order.Patients = append(r.order.Patients, out)
	for j, s := range p.Syringes {
		r.number = len(r.order.Syringes) + 1
		r.order.Syringes = append(r.order.Syringes, r.syringe(i, at(path, "syringe", j), s))
	}
	for j, s := range p.Infusions {
		r.number = len(r.order.Syringes) + 1
		r.order.Syringes = append(r.order.Syringes, r.infusion(i, at(path, "infusion", j), s))
	}
	r.number = 0
}

// called is the patient in messages.
func called(p Patient, i int) string {
	if p.ID.Given() {
		return fmt.Sprintf("patient %q", p.ID.Value)
	}
	return fmt.Sprintf("patient %d of the order", i+1)
}
