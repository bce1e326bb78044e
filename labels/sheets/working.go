package sheets

import (
	"math/big"

	"drawup/dilution"
	"drawup/dilution/body"
	"drawup/dilution/formulary"
	"drawup/dilution/recheck"
	"drawup/labels"
)

// A limitRow is one figure of a row of limits under its name.
type limitRow[T any] struct {
	name, binds string
	fig         formulary.Figure[T]
}

// Which way a limit binds.
const (
	from = "from "
	upTo = "up to "
)

// limitRows are the figures of a row of limits, from the lowest to the highest.
func limitRows[T any](r formulary.Rule[T]) []limitRow[T] {
	return []limitRow[T]{{"hard lowest", from, r.HardLow}, {"usual lowest", from, r.UsualLow}, {"usual highest", upTo, r.UsualHigh},
		{"soft highest", upTo, r.SoftHigh}, {"hard highest", upTo, r.HardHigh}}
}

// working are the steps of the sum with what each rounding lost (rule R2).
func (s scribe) working() []labels.Line {
	var out []labels.Line
	add := func(l labels.Line) {
		if len(l) > 0 {
			out = append(out, l)
		}
	}
	add(s.weightLine())
	if s.p.Dose != nil && s.f.Has("dose.weight") {
		add(s.say("dose: {dose} times {dose.weight} is {dose.amount}"))
	}
	if s.p.Presentation.Powder() {
		if s.f.Has("powder.displaced") {
			add(s.say("volume after mixing: {powder.added} added and {powder.displaced} taken by the powder make {container.volume}"))
		} else {
			add(s.say("volume after mixing: {powder.added} added give {container.volume}, as the label says"))
		}
	}
	add(s.say("strength: {container.amount} in {container.volume} is {strength}" + s.likeTheRest()))
	add(s.say("drug volume: {drug.wanted}, read as {drug.volume} on the {drug.barrel} barrel in steps of {drug.step}; rounding: {drug.moved}"))
	add(s.counted())
	add(s.diluentLine())
	add(s.say("amount: {drug.volume} of {strength} is {amount}"))
	add(s.say("concentration: {amount} in {final.volume} is {concentration}"))
	if s.f.Has("substance.amount") {
		add(s.say("amount of substance: {amount} at {substance.factor} is {substance.amount}, {substance.concentration}"))
	}
	if s.f.Has("second.amount") {
		add(joined(labels.Words("second drug, "+s.p.Presentation.SecondName+": "), s.say("{second.container} a container give {second.amount}, {second.concentration}")))
	}
	s.doseWorking(add)
	s.rateWorking(add)
	add(s.balance())
	assumed := ""
	if s.p.Mixture.AssayAssumed {
		assumed = ", assumed"
	}
	add(joined(s.say("interval: plus or minus {interval.percent}, {interval.low} to {interval.high}; assay limits plus or minus {assay}"+assumed+"; "), s.largest()))
	add(joined(s.say("use by: {prepared} ({prepared.offset} from UTC) and {use.hours} is {use.by} ({use.by.offset}); "), s.won(), labels.Words(" ends first ("+s.p.UseBy.Source+")")))
	return out
}

// weightLine is the weight or surface that the order goes by: as typed, or the
// equation behind it with what it starts from.
func (s scribe) weightLine() labels.Line {
	by := body.Kind(0)
	switch {
	case s.p.Dose != nil && s.f.Has("dose.weight"):
		by = s.p.Dose.By
	case s.p.Infusion != nil && s.f.Has("rate.weight"):
		by = s.p.Infusion.By
	}
	line := func(from, name string) labels.Line {
		return joined(labels.Words(by.Equation()), s.say(from+", is {"+name+".full}; used: {"+name+"}"))
	}
	switch by {
	case body.Actual:
		return s.say("weight: {weight.actual}, as typed")
	case body.Ideal:
		return line(": {sex}, {height}", "weight.ideal")
	case body.Adjusted:
		return line(": {weight.actual} against {weight.ideal} ideal ({sex}, {height})", "weight.adjusted")
	case body.Lean:
		return line(": {sex}, {height}, {weight.actual}", "weight.lean")
	case body.Surface:
		return joined(labels.Words(by.Equation()), s.say(": {height}, {weight.actual}; the root rounded to {surface}"))
	case body.None:
	}
	return nil
}

func (s scribe) diluentLine() labels.Line {
	switch s.p.Mixture.Method {
	case dilution.AddTo:
		return s.say("method: {method}; final volume: {diluent.volume} in the bag and {drug.volume} make {final.volume}")
	case dilution.WithdrawThenAdd:
		return s.say("method: {method}; {drug.volume} out of the bag leave {diluent.volume}, and with the drug it is {final.volume} again")
	case dilution.MakeUpTo:
		return s.say("method: {method}; diluent: {final.volume} less {drug.volume} is {diluent.volume}")
	case dilution.Neat:
		return s.say("method: {method}; final volume: {final.volume}, nothing added")
	}
	return nil
}

// doseWorking is one dose out of the syringe.
func (s scribe) doseWorking(add func(labels.Line)) {
	if s.p.Dose == nil {
		return
	}
	add(s.say("one dose: {dose.amount} at {concentration} is {dose.wanted}, read as {dose.volume} in steps of {dose.step}; rounding: {dose.moved}; that gives {dose.delivered}"))
}

// rateWorking is the start rate of the pump.
func (s scribe) rateWorking(add func(labels.Line)) {
	if s.p.Infusion == nil {
		return
	}
	times := ""
	if s.f.Has("rate.weight") {
		times = " times {rate.weight}"
	}
	add(s.say("pump rate: {start.dose}" + times + " at {concentration} is {start.flow}, set to {start.rate} in steps of {rate.step}; rounding: {start.moved}; that gives {start.delivered}"))
	add(s.say("ends of the range: {low.dose} rounded up is {low.rate}, {high.dose} rounded down is {high.rate}"))
	if s.f.Has(recheck.RunTime) {
		add(s.say("time: {final.volume} at {start.rate} last {run.time}, to {empty.at}"))
	}
	if s.p.Infusion.Wanted > 0 || s.p.Infusion.CountsOff() {
		add(joined(labels.Words("it lasts "), s.lasts()))
	}
	if line := s.oneWeight(); line != nil {
		add(line)
	}
}

// largest names what the interval comes from most (rule R9). The assay itself
// stands beside the interval whatever is largest: without it nobody could work
// the interval again.
func (s scribe) largest() labels.Line {
	m := s.p.Mixture
	best, pattern := m.Assay.Rat(), "most of it from the assay"
	if m.Method == dilution.Neat {
		return s.say(pattern)
	}
	if r := m.DrugReading.Relative(); r.Given() && r.Rat().Cmp(best) > 0 {
		best, pattern = r.Rat(), "most of it from reading {drug.volume} on the {drug.barrel} barrel"
	}
	if !m.InBag && m.FinalBarrel.Given() && m.FinalVolume.Given() && !m.FinalVolume.IsZero() {
		if tol := m.FinalBarrel.Tolerance(m.FinalVolume); tol.Given() {
			share := new(big.Rat).Quo(tol.Rat(), m.FinalVolume.Rat())
			if share.Mul(share, big.NewRat(100, 1)).Cmp(best) > 0 {
				pattern = "most of it from reading {final.volume} on the {final.barrel} barrel"
			}
		}
	}
	return s.say(pattern)
}
