package labels

import (
	"fmt"
	"strings"
	"time"

	"drawup/dilution"
	"drawup/dilution/body"
	"drawup/dilution/order"
	"drawup/dilution/quantity"
	"drawup/dilution/recheck"
	"drawup/dilution/refusal"
)

// A Making is what all papers of one run share: who made them, from which
// formulary, and the short digest of order, formulary and time (rule R19).
type Making struct {
	Place           string
	Preparer        string
	Made            string // date and time, as printed
	Formulary       string // name and version
	FormularyDigest string // first twelve digits
	State           string // approval line
	Approved        bool   // two people have signed for the formulary
	Digest          string // short digest, hexadecimal
	Serial          string // first five digits of every serial number
	Invented        bool
	Products        []Product // preparations with a GTIN of the site's own
}

// SerialOf is the eight-digit serial of syringe n: five digits of the run, then
// the number.
func (m Making) SerialOf(n int) string { return fmt.Sprintf("%s%03d", m.Serial, n) }

// ClassFor is the class of a plan's drug in the scheme that its site has picked.
func ClassFor(p dilution.Plan) (Class, bool) {
	s, ok := SchemeOf(p.Edition, p.Region)
	if !ok {
		return Class{}, false
	}
	return s.Class(p.Drug.Class)
}

// FromPlan is the label of one planned syringe.
func FromPlan(p dilution.Plan, w Facts, m Making) (Label, error) {
	class, ok := ClassFor(p)
	if !ok {
		return Label{}, fmt.Errorf("got label class %q, want one of Table 1", p.Drug.Class)
	}
	serial := m.SerialOf(p.Number)
	codes, err := codesOf(p, m)
	if err != nil {
		return Label{}, err
	}
	l := Label{Number: p.Number, Class: class, Concentration: w.Cell(recheck.Concentration),
		Amount:   Line{w.Cell(recheck.AmountInSyringe), {Text: " in "}, w.Cell(recheck.FinalVolume)},
		UseBy:    Line{{Text: "use by "}, w.Cell(recheck.UseBy)},
		Prepared: Line{{Text: "made "}, w.Cell(recheck.Prepared), {Text: " " + m.Preparer}},
		Serial:   Cell{Text: serial, Figure: recheck.Serial}, Codes: codes,
		Digest: m.Digest, Marks: marks(p, m)}
	l.names(p, w)
	if w.Has(recheck.SubstanceAmount) {
		l.Substance = Line{w.Cell(recheck.SubstanceAmount), {Text: " in "}, w.Cell(recheck.FinalVolume)}
	}
	if p.Dose != nil {
		l.Dose = doseLine(p, w)
		if p.Dose.Weight.Given() || p.Dose.Surface.Given() {
			l.Patient = p.Patient.ID.Value // a dose worked for one body is for nobody else
		}
	}
	if p.Route != "IV" || p.Infusion != nil {
		l.Route = p.Route
	}
	if p.Infusion != nil {
		l.infusion(p)
	}
	return l, nil
}

func (l *Label) names(p dilution.Plan, w Facts) {
	name := p.Name
	l.Other = p.Other
	if second := p.Presentation.SecondName; second != "" {
		name, _, _ = strings.Cut(name, " with ")
		l.Second, l.SecondConcentration = Capital(second), w.Cell(recheck.SecondConcentrated)
	}
	l.Name = Capital(name)
	if p.Drug.ShowAs {
		l.As = p.Drug.CountedAs
	}
}

// doseLine says what one dose is; a syringe that is one dose says just that.
func doseLine(p dilution.Plan, w Facts) Line {
	if p.Dose.Volume.Cmp(p.Mixture.FinalVolume) == 0 {
		return Words("one dose")
	}
	return Line{{Text: "dose "}, w.Cell(recheck.DoseVolume), {Text: " = "}, w.Cell(recheck.DoseDelivered)}
}

func (l *Label) infusion(p dilution.Plan) {
	l.Infusion, l.CheckedBy, l.Patient = true, true, p.Patient.ID.Value
	l.Diluent = Words("undiluted")
	if p.Mixture.Diluent != "" {
		l.Diluent = Words("in " + p.Mixture.Diluent)
	}
}

func marks(p dilution.Plan, m Making) []string {
	var out []string
	if !m.Approved {
		out = append(out, MarkStarter)
	}
	for _, r := range p.Cautions {
		if r.Code == refusal.Unverified {
			return append(out, MarkUnverified)
		}
	}
	return out
}

// Stated is everything that the papers of p say, for the second route:
// what was typed, the formulary's own text, and the figures of all papers.
func Stated(p dilution.Plan, figures []recheck.Figure) recheck.Stated {
	return recheck.Stated{
		Syringe: fmt.Sprintf("syringe %d, %s", p.Number, p.Drug.Name), Drug: p.Drug.Name,
		Presentation: p.Presentation.ID, Record: p.Drug.Raw, Asked: asked(p), Figures: figures,
	}
}

// asked is what the order, the site or the formulary row says, as typed.
func asked(p dilution.Plan) []recheck.Figure {
	var out []recheck.Figure
	add := func(name, text string) {
		if text != "" {
			out = append(out, recheck.Figure{Paper: "order", Name: name, Text: text})
		}
	}
	o := p.Settled
	add(recheck.Dose, typedDose(o.Dose.Text))
	add(recheck.AmountInSyringe, o.Amount.Text)
	add(recheck.Concentration, o.Concentration.Text)
	add(recheck.WeightActual, p.Patient.Weight.Text)
	add(recheck.Height, p.Patient.Height.Text)
	add(recheck.Age, p.Patient.Age.Text)
	add(recheck.Sex, p.Size.Sex.String()) // the order may say "girl"
	askedVolume(p, add)
	askedRates(p, add)
	askedBarrels(p, add)
	add(recheck.UseHours, Span(p.UseBy.Minutes))
	add(recheck.Prepared, p.Prepared.Format("2006-01-02 15:04"))
	add(recheck.PreparedOffset, p.Prepared.Format("-07:00"))
	for _, text := range typedBesides(p) {
		add(recheck.Typed, text)
	}
	if p.Mixture.AssayAssumed {
		add(recheck.Assay, p.Mixture.Assay.Written())
	}
	return out
}

// typedBesides are the other words of the order, and of the shelf where the plan
// says what to fetch from it: sentences may repeat their figures.
func typedBesides(p dilution.Plan) []string {
	o := p.Settled
	out := []string{o.AcceptedBy.Text, o.AcceptedReason.Text, o.Batch.Text, o.Expiry.Text, o.Indication.Text,
		o.Doses.Text, o.Hours.Text, o.Priming.Text, o.DeadSpace.Text, o.Each.Text}
	if part := p.Infusion; part != nil && part.DeadSpace.Given() {
		out = append(out, p.Style.Volume(part.DeadSpace))
	}
	for _, f := range p.Mixture.Fluids {
		out = append(out, p.Style.Volume(f.Volume))
	}
	if p.NeedleDeadSpace.Given() {
		out = append(out, p.Style.Volume(p.NeedleDeadSpace))
	}
	return out
}

// askedBarrels is the site's stock: the graduations of the barrels that are
// used, and the method that the order names or leaves to the tool.
func askedBarrels(p dilution.Plan, add func(name, text string)) {
	m, s := p.Mixture, p.Style
	add(recheck.DrugBarrel, s.Volume(m.DrugReading.Barrel.Nominal()))
	add(recheck.DrugStep, s.Volume(m.DrugReading.Barrel.Step()))
	if !m.InBag {
		add(recheck.FinalBarrel, s.Volume(m.FinalBarrel.Nominal()))
	}
	add(recheck.Method, m.Method.String())
	if p.Dose != nil {
		add(recheck.DoseStep, s.Volume(p.Dose.Step))
		if p.Dose.Down {
			add(recheck.DoseRounding, "down")
		}
		add(recheck.DoseWeightBy,
			weightWord(p.Dose.Weight.Given(), p.Dose.Surface.Given(), p.Order.DoseBy, p.Dose.Rule.By))
	}
}

// weightWord is which weight a dose goes by: the order's word, else the
// formulary's, "actual" where that names none; "surface" for a dose per m², and
// "none" for an absolute one.
func weightWord(weight, surface bool, ordered order.Field[body.Kind], row body.Kind) string {
	switch {
	case surface:
		return body.Surface.String()
	case !weight:
		return body.None.String()
	case ordered.Given():
		return ordered.Value.String()
	case row == body.None || row == 0 || row == body.Surface:
		return body.Actual.String()
	}
	return row.String()
}

// askedVolume says which volume the order's number meant (rule R5), and how much
// drug the order takes where it says so beside the other keys.
func askedVolume(p dilution.Plan, add func(name, text string)) {
	o := p.Settled
	text := o.Volume.Text
	switch {
	case o.Infusion && o.Mixture.Given():
		// What the rule comes to is asked until the second route has a sum for it.
		if !askedIfKnown(add, recheck.RuleRate, o.Each.Text) {
			add(recheck.AmountInSyringe, exactly(p.Infusion.RuleAmount))
		}
	case o.Infusion && !o.Concentration.Given():
		amount, volume, _ := strings.Cut(o.MixAmount.Text, " in ")
		if s, ok := p.Drug.Standard(p.Standard); ok {
			amount, volume = s.Amount.Written(), s.Volume.Written()
		}
		add(recheck.AmountInSyringe, strings.TrimSpace(amount))
		text = strings.TrimSpace(volume)
	case o.Doses.Given() && askedIfKnown(add, recheck.DoseCount, o.Doses.Text):
	case o.Doses.Given() && p.Mixture.Method == dilution.Neat:
		// So many doses as they are read, asked until the second route has a sum.
		add(recheck.DrugVolume, ungrouped(p.Style.Volume(p.Mixture.DrugVolume)))
	case o.Doses.Given() && !o.Concentration.Given():
		add(recheck.AmountInSyringe, exactly(p.Dose.Amount.Times(o.Doses.Value)))
	}
	if p.Mixture.Method == dilution.AddTo {
		add(recheck.DiluentVolume, text)
		return
	}
	add(recheck.FinalVolume, text)
}

// askedIfKnown asks under a name that the second route may not know yet, and
// reports whether it did.
func askedIfKnown(add func(name, text string), name, text string) bool {
	if !printed(name) {
		return false
	}
	add(name, text)
	return true
}

// exactly is an amount with all its digits, as an order would write it.
func exactly(a quantity.Amount) string {
	if !a.Given() {
		return ""
	}
	return a.Exact(a.Best()) + " " + a.Best().String()
}

func askedRates(p dilution.Plan, add func(name, text string)) {
	if p.Infusion == nil {
		return
	}
	part := p.Infusion
	if part.CountsOff() {
		askedIfKnown(add, recheck.Priming, p.Style.Volume(part.Priming))
		askedIfKnown(add, recheck.DeadSpace, p.Style.Volume(part.DeadSpace))
	}
	askedIfKnown(add, recheck.WantedTime, p.Order.Hours.Text)
	add(recheck.StartDose, typedDose(p.Order.Start.Text))
	if part.Down {
		add(recheck.RateRounding, "down")
	}
	add(recheck.RateWeightBy, weightWord(part.Weight.Given(), part.Surface.Given(), p.Order.RateBy, part.Rule.By))
	for i, rung := range part.Ladder {
		add(recheck.Row(recheck.Ladder, i+1, "dose"), ungrouped(p.Style.DoseRate(rung.Dose)))
	}
	minutes := part.Minutes
	if part.CountsOff() {
		minutes = part.Usable
	}
	empty := p.Prepared.Add(time.Duration(minutes) * time.Minute)
	add(recheck.EmptyOffset, empty.Format("-07:00"))
	add(recheck.RateStep, p.Style.FlowRate(part.Step))
	add(recheck.LowDose, part.Low.Dose.Written())
	add(recheck.HighDose, part.High.Dose.Written())
	add(recheck.LimitDose, part.Limit.Dose.Written())
	if part.Low.Dose.Written() == "" {
		add(recheck.LowDose, ungrouped(p.Style.DoseRate(part.Low.Dose)))
	}
	if part.High.Dose.Written() == "" {
		add(recheck.HighDose, ungrouped(p.Style.DoseRate(part.High.Dose)))
	}
}

// ungrouped is a printed figure as it would be typed: without separators.
func ungrouped(s string) string { return strings.NewReplacer(",", "", "\u00a0", "").Replace(s) }

// typedDose is the text of a dose without the word for the weight.
func typedDose(s string) string {
	for _, word := range []string{"actual", "total", "ideal", "adjusted", "lean", "surface"} {
		if t, ok := strings.CutSuffix(strings.TrimSpace(s), " "+word); ok {
			return strings.TrimSpace(t)
		}
	}
	return s
}
