package twostep

import (
	"math/big"

	"drawup/dilution/quantity"
	"drawup/dilution/syringe"
)

// A OneStep is the same target made in one step, for comparison: drawn with the
// smallest syringe that holds the volume, as every plan of one step is.
type OneStep struct {
	Draw   syringe.Reading
	Final  Mixture
	Error  quantity.Percent // as in [Plan]
	Spread *big.Rat         // as in [Plan], of two readings
}

// A Rival is a preparation that was weighed and lost.
type Rival struct {
	Plan
	Lost Reason // by what it lost to the one that was chosen

	// By what it is the best of all within the tolerance; neither: it is the next
	// in order.
	Narrowest, LeastWaste bool
}

// A Found is the intermediate dilution that was chosen, and what it was held
// against.
type Found struct {
	Plan

	// OneStep is the plan of one step; if there is none, OneStepError says why:
	// an error of [syringe.Measure].
	OneStep      *OneStep
	OneStepError error

	// Rivals are the next in order, the one with the narrowest interval and the
	// one that wastes least, within the tolerance, each only if it is another
	// preparation.
	Rivals []Rival

	Weighed int  // how many preparations were weighed
	Bounded bool // the search stopped at its bound: a better one may exist
}

// Find searches the best dilution of the target through an intermediate syringe:
// the one nearest to the target; of equally near ones the narrowest worst case of
// the readings; then the least drug left over; then the smallest syringes (their
// capacities in all); then the smaller intermediate, the smaller volume drawn,
// the smaller volume taken. Errors: *quantity.NotGivenError and *quantity.KindError
// for what is missing or counted in another way; *DisagreeError; *NotWeakerError;
// *BoundsError; *UnreadableError; *TooFineError; *NoneError; those of
// [syringe.Barrel.Read] for the final volume.
func Find(w Wanted) (Found, error) {
	if err := w.check(); err != nil {
		return Found{}, err
	}
	need, target, err := w.need()
	if err != nil {
		return Found{}, err
	}
	give, err := w.give()
	if err != nil {
		return Found{}, err
	}
	s := search{low: w.ofStrength(w.Low), high: w.ofStrength(w.High)}
	if s.grid, err = gridOf(w.Barrels, w.Smallest, w.Volume); err != nil {
		return Found{}, err
	}
	s.final = s.units(w.Volume)
	s.need = new(big.Rat).Mul(need.Rat(), new(big.Rat).SetInt(s.perML))
	off := new(big.Rat).Mul(s.need, new(big.Rat).Quo(w.Tolerance.Rat(), big.NewRat(100, 1)))
	s.least, s.most = new(big.Rat).Sub(s.need, off), new(big.Rat).Add(s.need, off)
	s.run()
	plan := func(c candidate) (Plan, error) {
		r := Readings{Give: give}
		if r.Draw, err = w.read(&s, c.drawn); err != nil {
			return Plan{}, err
		}
		if r.MakeUpTo, err = w.read(&s, c.made); err != nil {
			return Plan{}, err
		}
		if r.Take, err = w.read(&s, c.taken); err != nil {
			return Plan{}, err
		}
		p, err := Work(w.Strength, r)
		if err != nil {
			return Plan{}, err
		}
		p.Error = offBy(p.Final.Concentration, target)
		return p, nil
	}
	return w.choose(&s, plan, give, need, target)
}

// read is the reading of a volume of the grid.
func (w Wanted) read(s *search, v *volume) (syringe.Reading, error) {
	return v.barrel.Read(s.volume(v.n), w.Smallest, w.Tolerance)
}

// choose takes the best of what was weighed and says what else there was.
func (w Wanted) choose(
	s *search, plan func(candidate) (Plan, error), give syringe.Reading, need quantity.Volume, target quantity.Concentration,
) (Found, error) {
	list := s.nearest.sorted(s.need)
	if len(list) == 0 {
		return Found{}, &NoneError{Within: w.Tolerance, Weighed: s.weighed, Bounded: s.bounded}
	}
	best, err := plan(list[0])
	if err != nil {
		return Found{}, err
	}
	if new(big.Rat).Abs(best.Error.Rat()).Cmp(w.Tolerance.Rat()) > 0 {
		return Found{}, &NoneError{Within: w.Tolerance, Nearest: &best, Weighed: s.weighed, Bounded: s.bounded}
	}
	f := Found{Plan: best, Weighed: s.weighed, Bounded: s.bounded}
	if f.Rivals, err = s.rivals(list, plan); err != nil {
		return Found{}, err
	}
	f.OneStep, f.OneStepError = w.oneStep(give, need, target)
	return f, nil
}

// rivals are the narrowest, the most thrifty and the next in order, those within
// the tolerance, each once.
func (s *search) rivals(list []candidate, plan func(candidate) (Plan, error)) ([]Rival, error) {
	narrowest, thrifty := s.narrowest.sorted(s.need), s.thrifty.sorted(s.need)
	lost := append(append([]candidate{}, first(narrowest)...), first(thrifty)...)
	if len(list) > 1 {
		lost = append(lost, list[1])
	}
	limit := new(big.Rat).Sub(s.most, s.need)
	seen := map[candidate]bool{list[0]: true}
	var out []Rival
	for _, c := range lost {
		if seen[c] || c.off(s.need).Cmp(limit) > 0 {
			continue
		}
		seen[c] = true
		p, err := plan(c)
		if err != nil {
			return nil, err
		}
		_, why := s.nearest.by.across(&list[0], &c, s.need)
		out = append(out, Rival{Plan: p, Lost: why, Narrowest: c == narrowest[0], LeastWaste: c == thrifty[0]})
	}
	return out, nil
}

// first is the first of a list, if there is one.
func first(list []candidate) []candidate { return list[:min(1, len(list))] }

// oneStep draws the target's drug at once, if that can be measured.
func (w Wanted) oneStep(give syringe.Reading, need quantity.Volume, target quantity.Concentration) (*OneStep, error) {
	drawn, err := syringe.Measure(need, w.Barrels, w.Smallest, w.Tolerance)
	if err != nil {
		return nil, err
	}
	one := OneStep{Draw: drawn, Spread: big.NewRat(1, 1)}
	for _, r := range []syringe.Reading{drawn, give} {
		ratio, err := ratioOf(r)
		if err != nil {
			return nil, err
		}
		one.Spread.Mul(one.Spread, ratio)
	}
	if one.Final, err = mixture(w.Strength, drawn, give); err != nil {
		return nil, err
	}
	one.Error = offBy(one.Final.Concentration, target)
	return &one, nil
}
