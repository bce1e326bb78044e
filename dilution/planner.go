package dilution

import (
	"fmt"
	"strings"
	"time"

	"drawup/dilution/body"
	"drawup/dilution/formulary"
	"drawup/dilution/order"
	"drawup/dilution/pump"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/dilution/syringe"
)

// A work is one syringe while it is being planned. Reasons gather; the steps
// after a refusal still run where they can, so that all faults show at once.
type work struct {
	site    site
	f       *formulary.Formulary
	o       order.Syringe
	patient order.Patient
	size    body.Size
	plan    Plan
	sizes   []formulary.Presentation // sizes of one strength that may be opened together
	holder  syringe.Barrel           // the giving syringe, where the target settled it
	started *started                 // verdict of startPart
	steps   int                      // lines of the giving syringe added so that it lasts
	trying  bool                     // one of several ways, or an alternative: no remedy is worked out
	stopped bool                     // a way that cannot be made
	short   bool                     // it would last the hours with more in it
	doseOK  bool                     // verdict of pickDose
	noted   map[body.Kind]bool       // weights already commented on
	fixed   *Quick                   // a quick sum: its weight goes for every kind
	reasons refusal.List
}

// syringes names the syringes of numbers, runs of them short: "syringes 1, 3 to
// 5 and 8"; "all syringes" when they are all.
func syringes(numbers []int, all int) string {
	if len(numbers) == all && all > 1 {
		return "all syringes"
	}
	var parts []string
	for i := 0; i < len(numbers); {
		end := i
		for end+1 < len(numbers) && numbers[end+1] == numbers[end]+1 {
			end++
		}
		switch end - i {
		case 0:
			parts = append(parts, fmt.Sprint(numbers[i]))
		case 1:
			parts = append(parts, fmt.Sprint(numbers[i]), fmt.Sprint(numbers[end]))
		default:
			parts = append(parts, fmt.Sprintf("%d to %d", numbers[i], numbers[end]))
		}
		i = end + 1
	}
	if len(numbers) == 1 {
		return "syringe " + parts[0]
	}
	return "syringes " + joinAnd(parts)
}

// shared gathers what would otherwise be said of nearly every syringe.
func shared(plans []Plan) refusal.List {
	var assay, useBy []int
	for _, p := range plans {
		if p.Mixture.AssayAssumed {
			assay = append(assay, p.Number)
		}
		if p.UseBy.Won != "" && !p.UseBy.Stability {
			useBy = append(useBy, p.Number)
		}
	}
	var out refusal.List
	if len(assay) > 0 {
		out = append(out, refusal.Reason{
			Code: refusal.AssayAssumed, Severity: refusal.Caution,
			Rule: "R9", Field: "assay",
			Got: "none stored", Want: assumedAssay,
			Message: "no assay limits are stored for the containers of " + syringes(assay, len(plans)) +
				"; plus or minus " + assumedAssay + " is assumed for the interval",
		})
	}
	if len(useBy) > 0 {
		out = append(out, refusal.Reason{
			Code: refusal.UseByUnknown, Severity: refusal.Caution,
			Rule: "R18", Field: "stability",
			Got: "none stored", Want: "a stability at room temperature",
			Message: "no stability at room temperature is stored for " + syringes(useBy, len(plans)) +
				"; the use-by time follows site policy alone",
			Remedy: "check the pack and local policy",
		})
	}
	return out
}

// brokenSyringes are those whose order could not be read whole.
func brokenSyringes(faults refusal.List) map[int]bool {
	broken := map[int]bool{}
	for _, r := range faults.Refusals() {
		if r.Syringe != 0 {
			broken[r.Syringe] = true
		}
	}
	return broken
}

// unreadable reports that a value of the patient stands in the order and could
// not be read. The reading refused it; a second reason that calls it missing
// would mislead.
func unreadable(p order.Patient) bool {
	return p.Weight.Given() && !p.Weight.Value.Given() || p.Height.Given() && !p.Height.Value.Given() ||
		p.Age.Given() && !p.Age.Value.Given() || p.Sex.Given() && p.Sex.Value == 0
}

// newPlan works one syringe. A syringe whose order could not be read whole is
// not worked, but its drug and presentation are looked up, so that these faults
// show at once too.
func newPlan(
	s site,
	f *formulary.Formulary,
	o order.Order,
	sy order.Syringe,
	at time.Time,
	broken bool,
) *work {
	w := &work{site: s, f: f, o: sy, patient: o.Patients[sy.Patient]}
	w.plan = Plan{Number: sy.Number, Order: sy, Settled: sy, Patient: w.patient, Style: s.style, Prepared: at, Route: "IV", Edition: s.edition, Region: s.region}
	if sy.Route.Given() {
		w.plan.Route = sy.Route.Value
	}
	if broken {
		if sy.Drug.Given() && w.findDrug() && (s.stock == nil || sy.Presentation.Given()) {
			w.choosePresentation()
		}
		return w
	}
	w.size = body.Size{
		Sex: w.patient.Sex.Value, Age: w.patient.Age.Value,
		Height: w.patient.Height.Value, Weight: w.patient.Weight.Value,
	}
	w.plan.Size = w.size
	if s.stock != nil {
		w.plan.FromShelf, w.plan.NeedleDeadSpace = true, s.stock.needle
	}
	if w.findDrug() && w.nameIt() {
		w.make()
	}
	w.unverified()
	w.plan.Settled = w.o
	w.plan.Cautions = w.reasons.Cautions()
	return w
}

// rest works everything that follows from the mixture.
func (w *work) rest() bool {
	for _, step := range []func() bool{
		w.checkConcentration, w.dose, w.infusion, w.holdsTooMuch, w.localKnown, w.certainty, w.useBy, w.lasts, w.balance,
	} {
		if !step() {
			return false
		}
	}
	return true
}

// refuse adds a refusal and returns false, for "return w.refuse(…)".
func (w *work) refuse(r refusal.Reason) bool {
	r.Severity = refusal.Refuse
	w.add(r)
	return false
}

// caution adds a caution and returns true.
func (w *work) caution(r refusal.Reason) bool {
	r.Severity = refusal.Caution
	w.add(r)
	return true
}

func (w *work) add(r refusal.Reason) {
	r.Syringe = w.o.Number
	if r.Pos.Line == 0 {
		r.Pos = w.o.Pos
	}
	w.reasons = append(w.reasons, r)
}

// fault turns an error of a sum into a refusal; kinds that meet wrongly get
// the code of rule R4.
func (w *work) fault(err error, field string, pos refusal.Pos) bool {
	code, rule := refusal.NumberMalformed, "R1"
	switch e := err.(type) {
	case *quantity.KindError:
		return w.refuse(refusal.Reason{
			Code: refusal.AmountKindDiffer, Field: field,
			Got: e.Got.String(), Want: e.Want.String(),
			Rule: "R4", Pos: pos,
			Message: fmt.Sprintf("%s is counted by %v here, but %s is counted by %v; the two never convert",
				field, e.Got, w.plan.Drug.Name, e.Want),
			Remedy: "order it in the unit that stands on the ampoule",
		})
	case *quantity.SyntaxError:
		code = refusal.Code(e.Code)
	case *quantity.NotGivenError:
		code = refusal.QuantityMissing
	case *pump.BelowStep:
		return w.refuse(refusal.Reason{
			Code: refusal.RateBelowPump, Field: field,
			Got:  w.plan.Style.FlowRate(e.Exact),
			Want: "at least half of the pump's step, " + w.plan.Style.FlowRate(e.Step),
			Rule: "R8", Pos: pos,
			Message: fmt.Sprintf("the lowest dose of the range needs %s, less than the pump can be set to",
				w.plan.Style.FlowRate(e.Exact)),
			Remedy: "use a weaker mixture, or a higher lower end of the range",
		})
	}
	return w.refuse(refusal.Reason{
		Code: code, Field: field,
		Rule: rule, Pos: pos,
		Message: err.Error(),
		Remedy:  "check the order",
	})
}

// balance is the run-time check of rule R6: taken = in the syringe + left.
func (w *work) balance() bool {
	m := w.plan.Mixture
	if taken, err := m.taken(); err == nil {
		if sum, err := m.Amount.Plus(m.LeftAmount); err == nil && sum.Equal(taken) {
			return true
		}
	}
	return w.refuse(refusal.Reason{
		Code: refusal.RoutesDisagree, Rule: "R6",
		Message: "the amounts taken, drawn and left over do not balance: a fault of this program, not of yours",
		Remedy:  "do not use this result; report it",
	})
}

// taken is the amount in all containers that are opened.
func (m Mixture) taken() (quantity.Amount, error) {
	var sum quantity.Amount
	for i, pack := range m.Packs {
		a := pack.Presentation.Amount.Times(pack.Count)
		if i == 0 {
			sum = a
			continue
		}
		var err error
		if sum, err = sum.Plus(a); err != nil {
			return sum, err
		}
	}
	return sum, nil
}

// unverified gathers one caution for all unverified figures that were used.
func (w *work) unverified() {
	var list []string
	note := func(what string, unverified bool) {
		if unverified && !routeListed(list, what) {
			list = append(list, what)
		}
	}
	p := w.plan
	note("contents of the container", p.Presentation.Unverified)
	for _, pack := range p.Mixture.Packs {
		note("contents of the container", pack.Presentation.Unverified)
	}
	if p.Dose != nil {
		for _, f := range []formulary.Figure[quantity.Dose]{
			p.Dose.Rule.HardLow, p.Dose.Rule.UsualLow, p.Dose.Rule.UsualHigh,
			p.Dose.Rule.SoftHigh, p.Dose.Rule.HardHigh,
		} {
			note("dose "+p.Style.Dose(f.Value), f.Unverified)
		}
	}
	if p.Infusion != nil {
		for _, f := range []formulary.Figure[quantity.DoseRate]{
			p.Infusion.Rule.HardLow, p.Infusion.Rule.UsualLow, p.Infusion.Rule.UsualHigh,
			p.Infusion.Rule.SoftHigh, p.Infusion.Rule.HardHigh,
		} {
			note("dose rate "+p.Style.DoseRate(f.Value), f.Unverified)
		}
	}
	bounds, _ := w.boundsFor(w.line())
	for _, b := range bounds {
		note("concentration "+p.Style.Concentration(b.Low.Value), b.Low.Unverified)
		note("concentration "+p.Style.Concentration(b.High.Value), b.High.Unverified)
	}
	if len(list) > 0 {
		w.caution(refusal.Reason{
			Code: refusal.Unverified, Rule: "R13",
			Field: "formulary", Got: joinAnd(list),
			Message: "nobody has verified these figures: " + joinAnd(list),
			Remedy:  "check them against the pack and local policy",
		})
	}
}

func (w *work) use() string {
	if w.o.Infusion {
		return "infusion"
	}
	return "bolus"
}

func joinAnd(list []string) string {
	switch len(list) {
	case 0:
		return ""
	case 1:
		return list[0]
	}
	s := list[0]
	for _, x := range list[1 : len(list)-1] {
		s += ", " + x
	}
	return s + " and " + list[len(list)-1]
}

func joinOr(list []string) string {
	s := joinAnd(list)
	if len(list) > 1 {
		last := list[len(list)-1]
		s = s[:len(s)-len(" and "+last)] + " or " + last
	}
	return s
}

// ofPatient is the cautions of the reading that stand on a value of this
// patient, to be printed with each of the patient's syringes.
func ofPatient(faults refusal.List, o order.Order, patient int) refusal.List {
	var out refusal.List
	for _, r := range faults.Cautions().Of(0) {
		at := -1 // the patient in whose table the caution stands
		for i, p := range o.Patients {
			if p.Pos.Line <= r.Pos.Line && (at < 0 || p.Pos.Line > o.Patients[at].Pos.Line) {
				at = i
			}
		}
		if strings.HasPrefix(r.Field, "patient.") && at == patient {
			out = append(out, r)
		}
	}
	return out
}
