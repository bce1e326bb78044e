package main

import (
	"fmt"
	"io"
	"math/big"

	"drawup/dilution"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/dilution/syringe"
)

func mixFlags() []flagSpec {
	return append([]flagSpec{
		{"amount", "4 mg", "amount of drug in the syringe, with --final"},
		{"concentration", "80 microgram/mL", "concentration in the syringe, with --final or --powder"},
		{"final", "50 mL", "volume in the end"},
		{"strength", "2 mg/mL", `strength of the presentation; "20 mg in 10 mL" is read too`},
		{"take", "2 mL", "volume drawn from the presentation, with one of the next four"},
		{"diluent", "48 mL", "diluent added to what was drawn"},
		{"make-up-to", "50 mL", "volume to which it is filled up"},
		{"add-to", "250 mL", "bag that is already full; its volume grows"},
		{"replace-in", "250 mL", "bag from which the same volume is withdrawn first"},
		{"powder", "250 mg", "amount of powder in the vial"},
		{"add", "4.8 mL", "fluid added to the powder"},
		{"displacement", "0.2 mL", "volume that the powder itself takes, from its record"},
	}, limitFlags()...)
}

// A mixDocument is the answer of drawup mix.
type mixDocument struct {
	Method        string        `json:"method,omitempty"`
	Amount        *quantityJSON `json:"amount,omitempty"`
	DrugVolume    *quantityJSON `json:"drug_volume,omitempty"`
	Displacement  *quantityJSON `json:"displacement,omitempty"`
	DiluentVolume *quantityJSON `json:"diluent_volume,omitempty"`
	FinalVolume   *quantityJSON `json:"final_volume,omitempty"`
	Concentration *quantityJSON `json:"concentration,omitempty"`
	Interval      *intervalJSON `json:"interval,omitempty"`
	DrugReading   *readingJSON  `json:"drug_reading,omitempty"`
	Working       []string      `json:"working,omitempty"`
	findings
}

// Methods of mixing (rule R5: they are different sums).
const (
	methodNeat    = "neat"
	methodMakeUp  = "make up to"
	methodAdd     = "add diluent"
	methodAddTo   = "add to"
	methodReplace = "withdraw, then add"
	methodPowder  = "mix powder"
	methodFinal   = "amount in final volume"
)

// A mixture is one sum of drawup mix. Volumes that the sum does not know are
// not given.
type mixture struct {
	method                           string
	amount                           quantity.Amount
	strength                         quantity.Concentration
	drug, displaced, diluent, volume quantity.Volume
	bag                              quantity.Volume // as labelled, for the methods with a bag
	conc                             quantity.Concentration
}

func runMix(e env, args []string) int {
	r := newRequest("mix", mixFlags(), args)
	if r.help {
		return showHelp(e, "mix")
	}
	doc := &mixDocument{}
	if !r.refused() {
		if m, ok := readMixture(r); ok {
			workMix(r, m, doc)
		}
	}
	if r.refused() {
		doc = &mixDocument{}
	}
	return r.finish(e, doc, func(w io.Writer) { tellMix(w, doc) })
}

// readMixture chooses the sum by the flags and works its volumes.
func readMixture(r *request) (mixture, bool) {
	var m mixture
	var err error
	switch {
	case r.given("powder"):
		m, err = readPowder(r)
	case r.given("take"):
		m, err = readTake(r)
	default:
		m, err = readMakeUp(r)
	}
	if r.refused() {
		return m, false
	}
	if err == nil {
		m.conc, err = m.amount.In(m.volume)
	}
	if err != nil {
		r.add(mixFault(err))
		return m, false
	}
	return m, true
}

func mixFault(err error) refusal.Reason {
	if r, ok := err.(refusal.Reason); ok {
		return r
	}
	return faultOf("mix", err)
}

// readMakeUp is --amount or --concentration, --final and --strength: the drug
// volume is worked and the syringe made up.
func readMakeUp(r *request) (mixture, error) {
	r.exactlyOne("amount", "concentration")
	r.need("final", "an amount or a concentration needs the final volume")
	r.forbid("they go with --take or --powder", "diluent", "make-up-to", "add-to", "replace-in", "add", "displacement")
	m := mixture{
		method: methodMakeUp, amount: read(r, "amount", quantity.ParseAmount), volume: read(r, "final", quantity.ParseVolume),
		strength: read(r, "strength", quantity.ParseConcentration),
	}
	conc := read(r, "concentration", quantity.ParseConcentration)
	if r.refused() {
		return m, nil
	}
	var err error
	if conc.Given() {
		if m.amount, err = m.volume.Holds(conc); err != nil {
			return m, err
		}
	}
	if !m.strength.Given() {
		m.method = methodFinal
		return m, nil
	}
	if m.drug, err = m.amount.DrawnAt(m.strength); err != nil {
		return m, err
	}
	return m, m.fill(r)
}

// fill works the diluent of a final volume.
func (m *mixture) fill(r *request) error {
	if m.drug.Cmp(m.volume) > 0 {
		return refusal.Reason{
			Code: refusal.ContradictoryAmounts, Severity: refusal.Refuse, Field: "drug volume", Rule: "R5",
			Got: r.style.Volume(m.drug), Want: "at most " + r.style.Volume(m.volume),
			Message: fmt.Sprintf("the drug alone takes %s, more than the final volume of %s", r.style.Volume(m.drug), r.style.Volume(m.volume)),
			Remedy:  "use a stronger presentation, a larger final volume or less drug",
		}
	}
	if m.drug.Cmp(m.volume) == 0 {
		m.method = methodNeat
	}
	var err error
	m.diluent, err = m.volume.Minus(m.drug)
	return err
}

// readTake is --take and --strength with one of the four ways to dilute.
func readTake(r *request) (mixture, error) {
	r.need("strength", "the amount in what is taken is not known without it")
	r.exactlyOne("diluent", "make-up-to", "add-to", "replace-in")
	r.forbid("--take says how much drug there is", "amount", "concentration", "final", "add", "displacement")
	m := mixture{drug: read(r, "take", quantity.ParseVolume), strength: read(r, "strength", quantity.ParseConcentration)}
	diluent, makeUp := read(r, "diluent", quantity.ParseVolume), read(r, "make-up-to", quantity.ParseVolume)
	addTo, replace := read(r, "add-to", quantity.ParseVolume), read(r, "replace-in", quantity.ParseVolume)
	if r.refused() {
		return m, nil
	}
	var err error
	if m.amount, err = m.drug.Holds(m.strength); err != nil {
		return m, err
	}
	switch {
	case diluent.Given():
		m.method, m.diluent = methodAdd, diluent
		m.volume = m.drug.Plus(diluent)
	case addTo.Given():
		m.method, m.diluent, m.bag = methodAddTo, addTo, addTo
		m.volume = m.drug.Plus(addTo)
	case makeUp.Given():
		m.method, m.volume = methodMakeUp, makeUp
		return m, m.fill(r)
	case replace.Given():
		m.method, m.volume, m.bag = methodReplace, replace, replace
		err = m.fill(r)
	}
	return m, err
}

// readPowder is --powder with what is added and what the powder displaces, or
// with the volume in the end (rule R7).
func readPowder(r *request) (mixture, error) {
	r.forbid("a powder has no volume to take", "amount", "strength", "take", "diluent", "make-up-to", "add-to", "replace-in")
	m := mixture{
		method: methodPowder, amount: read(r, "powder", quantity.ParseAmount), diluent: read(r, "add", quantity.ParseVolume),
		displaced: read(r, "displacement", quantity.ParseVolume), volume: read(r, "final", quantity.ParseVolume),
	}
	conc := read(r, "concentration", quantity.ParseConcentration)
	if r.refused() {
		return m, nil
	}
	if conc.Given() {
		r.atMostOne("concentration", "final")
		r.atMostOne("concentration", "add")
		var err error
		if m.volume, err = m.amount.DrawnAt(conc); err != nil {
			return m, err
		}
	}
	return m, m.closePowder(r)
}

// closePowder finds the third of added, displaced and final volume.
func (m *mixture) closePowder(r *request) error {
	add, displaced, final := m.diluent.Given(), m.displaced.Given(), m.volume.Given()
	var err error
	switch {
	case add && displaced && final:
		if m.diluent.Plus(m.displaced).Cmp(m.volume) != 0 {
			return refusal.Reason{
				Code: refusal.ContradictoryAmounts, Severity: refusal.Refuse, Field: "--final", Rule: "R7",
				Message: fmt.Sprintf("%s added and %s displaced make %s, not %s", r.style.Volume(m.diluent), r.style.Volume(m.displaced),
					r.style.Volume(m.diluent.Plus(m.displaced)), r.style.Volume(m.volume)),
				Remedy: "leave one of the three out",
			}
		}
	case add && displaced:
		m.volume = m.diluent.Plus(m.displaced)
	case final && displaced:
		m.diluent, err = m.rest(r, m.displaced)
	case final && add:
		m.displaced, err = m.rest(r, m.diluent)
	case final && r.given("final"):
	default:
		return refusal.Reason{
			Code: refusal.DisplacementBlank, Severity: refusal.Refuse, Field: "--displacement", Rule: "R7",
			Message: "a powder takes room of its own, and neither that volume nor the volume after mixing is given",
			Remedy:  `add --displacement "0.2 mL" from the record of the powder, or --final "5 mL" if that is what it gives`,
		}
	}
	return err
}

// rest is what the final volume leaves beside part.
func (m *mixture) rest(r *request, part quantity.Volume) (quantity.Volume, error) {
	left, err := m.volume.Minus(part)
	if err != nil {
		return left, refusal.Reason{
			Code: refusal.ContradictoryAmounts, Severity: refusal.Refuse, Field: "--final", Rule: "R7",
			Got: r.style.Volume(m.volume), Want: "at least " + r.style.Volume(part),
			Message: fmt.Sprintf("%s alone is more than the volume after mixing, %s", r.style.Volume(part), r.style.Volume(m.volume)),
			Remedy:  "check the volumes, and the concentration if one is given",
		}
	}
	return left, nil
}

func workMix(r *request, m mixture, doc *mixDocument) {
	if !balanced(r, m) {
		return
	}
	doc.Method = m.method
	doc.Amount, doc.FinalVolume = amountJSON(r.style, m.amount), volumeJSON(r.style, m.volume)
	doc.Concentration = concentrationJSON(r.style, m.conc)
	for _, p := range []struct {
		to *(*quantityJSON)
		v  quantity.Volume
	}{{&doc.DrugVolume, m.drug}, {&doc.Displacement, m.displaced}, {&doc.DiluentVolume, m.diluent}} {
		if p.v.Given() {
			*p.to = volumeJSON(r.style, p.v)
		}
	}
	doc.Working = mixWorking(r, m, doc)
	parts, ok := mixParts(r, m, doc)
	if ok && len(parts) > 0 {
		var err error
		if doc.Interval, err = intervalOf(r.style, m.conc, parts); err != nil {
			r.add(faultOf("interval", err))
		}
	}
	mixCautions(r, m)
	r.checkLimits(dilution.Quick{Concentration: m.conc, Strength: m.strength})
}

// balanced checks at run time that nothing is lost (rule R6): the parts make
// the final volume, and what is drawn holds the amount.
func balanced(r *request, m mixture) bool {
	sound := true
	if m.diluent.Given() && m.drug.Given() {
		sound = m.drug.Plus(m.diluent).Cmp(m.volume) == 0
	}
	if held, err := m.volume.Holds(m.conc); err != nil || !held.Equal(m.amount) {
		sound = false
	}
	if m.drug.Given() {
		if drawn, err := m.drug.Holds(m.strength); err != nil || !drawn.Equal(m.amount) {
			sound = false
		}
	}
	if !sound {
		r.add(refusal.Reason{
			Code: refusal.RoutesDisagree, Rule: "R6", Field: "mix",
			Message: "the volumes and the amount do not balance: a fault of this program",
			Remedy:  "work the mixture by hand and report the command",
		})
	}
	return sound
}

// mixParts is how far each measured volume can be off, as a share of the
// concentration in per cent. It is false when a volume cannot be measured.
func mixParts(r *request, m mixture, doc *mixDocument) ([]*big.Rat, bool) {
	one := big.NewRat(1, 1)
	p := &widths{r: r, all: true}
	if m.drug.Given() && !m.drug.IsZero() {
		weight := one
		if m.method == methodAdd { // the share of the other volume weighs each reading (GUM)
			weight = share(m.diluent, m.volume)
		}
		if got, ok := p.add("drug volume", m.drug, weight); ok {
			doc.DrugReading = readingOf(r.style, got)
		}
	}
	switch m.method {
	case methodMakeUp:
		p.add("final volume", m.volume, one)
	case methodAdd, methodPowder:
		if m.diluent.Given() && !m.diluent.IsZero() {
			p.add("diluent volume", m.diluent, share(m.diluent, m.volume))
		}
	case methodNeat, methodFinal: // nothing is diluted, or nothing is known
		return nil, false
	case methodAddTo, methodReplace: // the bag's own error is a caution
	}
	return p.parts, p.all
}

// widths gathers the half widths of readings in per cent.
type widths struct {
	r     *request
	parts []*big.Rat
	all   bool // every volume could be measured
}

// add reads v on a barrel and keeps its half width times weight.
func (p *widths) add(field string, v quantity.Volume, weight *big.Rat) (syringe.Reading, bool) {
	got, ok := p.r.measure(field, v)
	if !ok {
		p.all = false
		return got, false
	}
	p.parts = append(p.parts, new(big.Rat).Mul(halfWidth(got), weight))
	return got, true
}

// share is v as a part of whole.
func share(v, whole quantity.Volume) *big.Rat { return new(big.Rat).Quo(v.Rat(), whole.Rat()) }
