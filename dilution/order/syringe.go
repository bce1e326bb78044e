package order

import (
	"errors"
	"fmt"

	"drawup/dilution/body"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// common reads what a syringe and an infusion share.
func (r *reader) common(patient int, path []any, s commonRecord) Syringe {
	out := Syringe{
		Number: r.number, Patient: patient, Pos: r.places.Of(path...),
		Drug:           r.text(s.Drug, at(path, "drug")),
		Presentation:   r.text(s.Presentation, at(path, "presentation")),
		Indication:     r.text(s.Indication, at(path, "indication")),
		Diluent:        r.text(s.Diluent, at(path, "diluent")),
		Route:          r.text(s.Route, at(path, "route")),
		Batch:          r.text(s.Batch, at(path, "batch")),
		Size:           read(r, s.Size, quantity.ParseVolume, at(path, "size")),
		Expiry:         read(r, r.loose(s.Expiry, at(path, "expiry")), r.parseExpiry, at(path, "expiry")),
		AcceptedBy:     r.text(s.AcceptedBy, at(path, "accepted_by")),
		AcceptedReason: r.text(s.AcceptedReason, at(path, "accepted_reason")),
	}
	r.drug = out.Drug.Value
	r.required(out.Drug.Given(), path, "drug", r.here(), `drug = "etomidate"`)
	if out.AcceptedBy.Given() != out.AcceptedReason.Given() {
		r.required(out.AcceptedBy.Given(), path, "accepted_by", r.here(), `accepted_by = "the name of who decides"`)
		r.required(out.AcceptedReason.Given(), path, "accepted_reason", r.here(), `accepted_reason = "why this is right here"`)
	}
	return out
}

// here is the syringe being read, in messages.
func (r *reader) here() string {
	if r.drug == "" {
		return fmt.Sprintf("syringe %d", r.number)
	}
	return fmt.Sprintf("syringe %d (%s)", r.number, r.drug)
}

// syringe reads one syringe that is given at once.
func (r *reader) syringe(patient int, path []any, s syringeRecord) Syringe {
	out := r.common(patient, path, s.commonRecord)
	out.Dose, out.DoseBy = dosed(r, s.Dose, quantity.ParseDose, at(path, "dose"))
	out.Amount = read(r, s.Amount, quantity.ParseAmount, at(path, "amount"))
	out.Concentration = read(r, s.Concentration, quantity.ParseConcentration, at(path, "concentration"))
	out.Volume = read(r, s.Volume, quantity.ParseVolume, at(path, "volume"))
	out.Doses = r.count(s.Doses, at(path, "doses"))
	if s.Dilute {
		out.Dilute = Field[bool]{true, "true", r.places.Of(at(path, "dilute_if_needed")...)}
	}
	r.wanted(path)
	r.several(path, s.Dilute)
	r.threeFit(path, out)
	if out.Dose.Value.Given() {
		r.bodyFor(at(path, "dose"), patient, out.Dose.Value.Basis(), out.DoseBy)
	}
	return out
}

// combinations says what the four keys of a syringe may be together.
const combinations = "dose; amount; amount and volume; concentration and volume; a dose with amount and volume or with concentration and volume; or doses beside a dose"

// wanted refuses combinations of keys that say too little or contradict each
// other. A key whose value did not read is there all the same.
func (r *reader) wanted(path []any) {
	has := func(name string) bool { return r.places.Has(at(path, name)...) }
	dose, amount, conc, volume := has("dose"), has("amount"), has("concentration"), has("volume")
	if dose && has("doses") && !amount {
		return // the number of doses settles what is missing
	}
	conflict := func(name, message, remedy string) {
		r.refuse(at(path, name), refusal.Reason{Code: refusal.KeyConflict, Message: message, Got: name, Want: combinations, Remedy: remedy})
	}
	switch {
	case !dose && !amount && !conc:
		r.refuse(path, refusal.Reason{Code: refusal.KeyMissing, Message: r.here() + " does not say how much is wanted",
			Got: "no dose, amount or concentration", Want: combinations, Remedy: `add a line such as: dose = "0.3 mg/kg lean"`})
	case conc && !volume && !amount:
		r.refuse(at(path, "volume"), refusal.Reason{Code: refusal.KeyMissing, Message: r.here() + " has a concentration, and no volume to make of it",
			Got: "no volume", Want: combinations, Remedy: `add a line such as: volume = "10 mL"`})
	case conc && amount && !volume:
		conflict("amount", r.here()+" has an amount and a concentration, and no volume", "write the volume and one of the two")
	case dose && amount && !volume:
		conflict("amount", r.here()+" has a dose and an amount, and it is not clear which one is to be drawn up", "take one of them out, or add the volume that holds the amount")
	case dose && volume && !amount && !conc:
		conflict("volume", r.here()+" has a dose and a volume, and neither an amount nor a concentration for that volume", "add the concentration, or take the volume out")
	}
}

// threeFit refuses an amount that is not concentration times volume when all
// three are given.
func (r *reader) threeFit(path []any, s Syringe) {
	if !s.Amount.Value.Given() || !s.Concentration.Value.Given() || !s.Volume.Value.Given() {
		return
	}
	holds, err := s.Volume.Value.Holds(s.Concentration.Value)
	if err != nil {
		return
	}
	n, err := s.Amount.Value.Cmp(holds)
	var kind *quantity.KindError
	if errors.As(err, &kind) {
		r.kindsDiffer(at(path, "amount"), s.Amount.Text, s.Concentration.Text)
		return
	}
	if err == nil && n == 0 {
		return
	}
	printed := quantity.UK().Amount(holds)
	r.refuse(at(path, "amount"), refusal.Reason{Code: refusal.KeyConflict, Got: s.Amount.Text, Want: printed,
		Message: fmt.Sprintf("%s says %s, and %s of %s hold %s", r.here(), s.Amount.Text, s.Volume.Text, s.Concentration.Text, printed),
		Remedy:  "mend one of the three, or take one out", Rule: "R6"})
}

func (r *reader) kindsDiffer(path []any, got, other string) {
	r.refuse(path, refusal.Reason{Code: refusal.AmountKindDiffer, Got: got, Want: "the same way of counting as " + other, Rule: "R4",
		Message: fmt.Sprintf("%s counts the drug in two ways, %s and %s, that cannot be compared", r.here(), got, other),
		Remedy:  "write both in mass, both in units or both in mmol"})
}

// mixture is an amount made up to a volume.
type mixture struct {
	amount quantity.Amount
	volume quantity.Volume
}

func parseMix(s string) (mixture, error) {
	a, v, err := quantity.ParseMix(s)
	if err != nil {
		return mixture{}, err
	}
	return mixture{a, v}, nil
}

// ratesFit refuses from, start and to that are not in this order, or not
// counted alike.
func (r *reader) ratesFit(path []any, s Syringe) {
	start := s.Start
	if !start.Value.Given() {
		return
	}
	for _, end := range []struct {
		name string
		rate Field[quantity.DoseRate]
		sign int // what Cmp must not give
		want string
	}{
		{"from", s.From, +1, "not above the start, "},
		{"to", s.To, -1, "not below the start, "},
	} {
		if !end.rate.Value.Given() {
			continue
		}
		n, err := end.rate.Value.Cmp(start.Value)
		var kind *quantity.KindError
		switch {
		case errors.As(err, &kind):
			r.kindsDiffer(at(path, end.name), end.rate.Text, start.Text)
		case err != nil:
			r.refuse(at(path, end.name), refusal.Reason{Code: refusal.KeyConflict, Got: end.rate.Text, Want: "per kg, per m2 or neither, as in " + start.Text, Rule: "R3",
				Message: fmt.Sprintf("%s starts with %s, and its %q is counted per something else", r.here(), start.Text, end.name), Remedy: "write both in the same unit"})
		case n == end.sign:
			r.refuse(at(path, end.name), refusal.Reason{Code: refusal.KeyConflict, Got: end.rate.Text, Want: end.want + start.Text,
				Message: fmt.Sprintf("%s starts with %s, outside its own range: %q is %s", r.here(), start.Text, end.name, end.rate.Text), Remedy: "mend the range or the start"})
		}
	}
}

// bodyFor refuses a dose that goes by a weight or surface which the order does
// not give, and a word that does not fit the dose's unit. What the formulary's
// own choice of weight needs, the plan asks for.
func (r *reader) bodyFor(path []any, patient int, basis quantity.Basis, by Field[body.Kind]) {
	fits := true
	switch by.Value {
	case body.Actual, body.Ideal, body.Adjusted, body.Lean:
		fits = basis == quantity.PerKilogram
	case body.Surface:
		fits = basis == quantity.PerSquareMetre
	case body.None:
		fits = basis == quantity.Absolute
	}
	if !fits {
		r.refuse(path, refusal.Reason{Code: refusal.KeyConflict, Got: fmt.Sprintf("%q after a dose that is %v", by.Text, basis),
			Want: "a weight after a dose per kg, surface after a dose per m2, nothing after an absolute dose", Rule: "R3",
			Message: fmt.Sprintf("%s names %q, and its dose is not counted by that", r.here(), by.Text), Remedy: "mend the unit or take the word out"})
		return
	}
	switch basis {
	case quantity.PerKilogram:
		r.needs(path, patient, "weight", refusal.WeightMissing, `weight = "72 kg"`)
		if by.Value == body.Ideal || by.Value == body.Adjusted || by.Value == body.Lean {
			r.needs(path, patient, "height", refusal.HeightMissing, `height = "178 cm"`)
			r.needs(path, patient, "sex", refusal.SexMissing, `sex = "female"`)
		}
	case quantity.PerSquareMetre:
		r.needs(path, patient, "weight", refusal.WeightMissing, `weight = "72 kg"`)
		r.needs(path, patient, "height", refusal.HeightMissing, `height = "178 cm"`)
	}
}

// needs refuses a dose for want of one of the patient's values. A value that
// is there and did not read has its own reason.
func (r *reader) needs(path []any, patient int, name string, code refusal.Code, example string) {
	if r.places.Has("patient", patient, name) {
		return
	}
	p := r.order.Patients[patient]
	r.refuse(path, refusal.Reason{Code: code, Field: "patient." + name, Got: "nothing", Want: "the " + name + " of " + called(p, patient), Rule: "R3",
		Message: fmt.Sprintf("the dose of %s goes by the body, and %s has no %s", r.here(), called(p, patient), name),
		Remedy:  fmt.Sprintf("add to %s a line such as: %s", called(p, patient), example)})
}
