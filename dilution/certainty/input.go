package certainty

import (
	"math/big"

	"drawup/dilution/quantity"
)

// An input is one thing that may be off: a volume in mL, or for the assay a
// share of the printed strength.
type input struct {
	source            Source
	stated, low, high *big.Rat
	raises            bool // the concentration rises with it
	known             bool // its limits are known
}

// A corner says which value of every input to take.
type corner int

const (
	stated  corner = iota // as the plan says
	middle                // the middle of the limits
	lowest                // what makes the concentration lowest
	highest               // what makes it highest
)

func (x input) at(c corner) *big.Rat {
	switch {
	case c == stated:
		return x.stated
	case c == middle:
		return x.middle()
	case x.raises == (c == highest):
		return x.high
	}
	return x.low
}

func (x input) middle() *big.Rat {
	m := new(big.Rat).Add(x.low, x.high)
	return m.Mul(m, big.NewRat(1, 2))
}

// half is the half width of the limits.
func (x input) half() *big.Rat {
	h := new(big.Rat).Sub(x.high, x.low)
	return h.Mul(h, big.NewRat(1, 2))
}

// reading is what may be off in a volume read on a syringe. It must stand on
// the graduation: between the lines nothing can be read.
func reading(m Measured, part Part, step int, raises bool) (input, error) {
	s := Source{part, step, m}
	if !m.Volume.Given() {
		return input{}, missing("the " + s.String())
	}
	if !m.Barrel.Given() {
		return input{}, missing("the syringe for the " + s.String())
	}
	v := m.Volume.Rat()
	if v.Sign() == 0 || m.Volume.Cmp(m.Barrel.Nominal()) > 0 {
		return input{}, wrong(s, text(m.Volume), "above 0 mL and at most "+text(m.Barrel.Nominal()))
	}
	if !new(big.Rat).Quo(v, m.Barrel.Step().Rat()).IsInt() {
		return input{}, wrong(s, text(m.Volume), "a multiple of "+text(m.Barrel.Step()))
	}
	t := m.Barrel.Tolerance(m.Volume).Rat()
	if t.Cmp(v) >= 0 {
		return input{}, wrong(s, text(m.Volume), "more than its tolerance of "+exactly(t))
	}
	return input{s, v, new(big.Rat).Sub(v, t), new(big.Rat).Add(v, t), raises, true}, nil
}

// readings are those of one part, in the order given.
func readings(list []Measured, part Part, step int, raises bool) ([]input, error) {
	if len(list) == 0 {
		return nil, missing("the " + Source{Part: part, Step: step}.String())
	}
	var out []input
	for _, m := range list {
		x, err := reading(m, part, step, raises)
		if err != nil {
			return nil, err
		}
		out = append(out, x)
	}
	return out, nil
}

// fill is what may be off in a volume that nobody reads; more of it dilutes.
func fill(f Fill, part Part, step int) (input, error) {
	s := Source{Part: part, Step: step}
	if !f.Stated.Given() {
		return input{}, missing("the " + s.String())
	}
	v := f.Stated.Rat()
	switch {
	case !f.Least.Given() && !f.Most.Given():
		return input{s, v, v, v, false, false}, nil
	case !f.Least.Given() || !f.Most.Given():
		return input{}, missing("the other limit of the " + s.String())
	case f.Least.Cmp(f.Most) > 0:
		return input{}, wrong(s, text(f.Least)+" at least", "no more than "+text(f.Most)+", the most")
	}
	return input{s, v, f.Least.Rat(), f.Most.Rat(), false, true}, nil
}

// assay is what may be off in the printed strength.
func assay(l Limits) (input, error) {
	s := Source{Part: Assay}
	if !l.Low.Given() || !l.High.Given() {
		return input{}, missing("the " + s.String())
	}
	low, high := share(l.Low), share(l.High)
	if low.Sign() <= 0 || low.Cmp(high) > 0 {
		return input{}, wrong(s, l.Low.Exact()+" % to "+l.High.Exact()+" %", "two limits above 0 %, the lower one first")
	}
	return input{s, big.NewRat(1, 1), low, high, true, true}, nil
}

// share is p as a share of 1.
func share(p quantity.Percent) *big.Rat { return new(big.Rat).Quo(p.Rat(), big.NewRat(100, 1)) }

// perCent is a share of 1 as per cent.
func perCent(r *big.Rat) quantity.Percent {
	return quantity.PerCent(new(big.Rat).Mul(r, big.NewRat(100, 1)))
}
