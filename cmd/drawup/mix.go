package main

import (
	"io"
	"math/big"

	"drawup/dilution"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
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
		{"each", "1 microgram/kg/min", "a mixture for one weight: what each 1 mL/h is to give; with --weight"},
		{"weight", "6 kg", "with --each: the body weight that the mixture is for"},
		{"rule", "three", "with --each, in place of --final: three makes 50 mL, six makes 100 mL"},
		{"bag-holds", "265 mL", "with --add-to or --replace-in: what the bag was measured to hold"},
		{"assay", "5 %", "half width of the presentation's assay limits, for the interval"},
		{"presentation", "ampoule 4 mg in 4 mL", "with --drug: the presentation, as drawup formulary show names it"},
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
	Presentations []string      `json:"presentations,omitempty"` // that it may be drawn from
	Containers    int           `json:"containers,omitempty"`    // opened, where there is one presentation
	Diluent       string        `json:"diluent,omitempty"`
	Working       []string      `json:"working,omitempty"`
	bagJSON
	weightMadeJSON
	patientJSON
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
	measured                         quantity.Volume // what the bag was measured to hold, if it was
	conc                             quantity.Concentration
	each                             quantity.DoseRate // of a mixture for one weight
	weight                           quantity.BodyWeight
	assay                            quantity.Percent // as typed
}

func runMix(e env, args []string) int {
	r := newRequest("mix", mixFlags(), args)
	if r.help {
		return showHelp(e, "mix")
	}
	doc := &mixDocument{}
	if r.given("drug") {
		r.need("use", "the limits of a mixture depend on whether it is for a bolus or an infusion")
	}
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
	m.readAssay(r)
	m.bagNeedsInfusion(r)
	if r.refused() {
		return m, false
	}
	if err == nil {
		m.conc, err = m.amount.In(m.volume)
	}
	if err != nil {
		r.add(sumFault("mix", err))
		return m, false
	}
	return m, true
}

// widestAssay is the widest assay limits that are read, in per cent: our own net.
const widestAssay = 25

// readAssay is --assay; a drug of the formulary brings its own.
func (m *mixture) readAssay(r *request) {
	if r.given("drug") {
		r.forbid("the formulary's assay limits are taken", "assay")
		return
	}
	m.assay = read(r, "assay", quantity.ParsePercent)
	if m.assay.Given() && m.assay.Rat().Cmp(big.NewRat(widestAssay, 1)) > 0 {
		r.strange("assay", refusal.ValueUnknown, "at most 25 %", "is wider than any assay limits")
	}
}

// bagNeedsInfusion refuses a bag for a single dose: an order knows none either.
func (m *mixture) bagNeedsInfusion(r *request) {
	if m.bag.Given() && r.given("drug") && r.texts["use"].text == "bolus" {
		r.forbid("a bag is for an infusion", "add-to", "replace-in")
	}
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
	limits := r.checkLimits(m.quick(r))
	doc.Containers, doc.Diluent = limits.Containers, limits.Diluent
	for _, p := range limits.Presentations {
		doc.Presentations = append(doc.Presentations, p.ID)
	}
	m.spread(r, doc, limits)
	mixCautions(r, m)
	m.tellBag(r, doc)
	m.tellEach(r, doc, limits)
}

// spread fills in the interval: from measuring, and from the assay limits that
// are typed or on record (rule R9).
func (m mixture) spread(r *request, doc *mixDocument, limits dilution.QuickLimits) {
	parts, ok := mixParts(r, m, doc)
	assay := m.assay
	if len(limits.Presentations) > 0 {
		var assumed bool
		var err error
		if assay, assumed, err = dilution.WidestAssay(limits.Presentations); err != nil {
			r.add(faultOf("assay", err))
			return
		}
		if assumed {
			r.caution(refusal.Reason{
				Code: refusal.AssayAssumed, Field: "assay", Rule: "R9", Got: "none stored", Want: r.style.Percent(assay),
				Message: "no assay limits of " + limits.Presentations[0].ID + " are stored; plus or minus " + r.style.Percent(assay) + " is assumed for the interval",
			})
		}
	}
	if !ok || len(parts) == 0 && !assay.Given() {
		return
	}
	var err error
	if doc.Interval, err = intervalOf(r.style, m.conc, parts, assay); err != nil {
		r.add(faultOf("interval", err))
	}
}

// quick is the mixture to be held against the formulary.
func (m mixture) quick(r *request) dilution.Quick {
	q := dilution.QuickMix{Presentation: r.texts["presentation"].text, Drug: m.drug, Final: m.volume}
	switch m.method {
	case methodPowder:
		q.Method, q.Powder = dilution.Neat, m.amount
	case methodNeat:
		q.Method = dilution.Neat
	case methodMakeUp, methodAdd, methodFinal:
		q.Method = dilution.MakeUpTo
	case methodAddTo:
		q.Method = dilution.AddTo
	case methodReplace:
		q.Method = dilution.WithdrawThenAdd
	}
	return dilution.Quick{Concentration: m.conc, Strength: m.strength, Mix: &q}
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
