package certainty

import "math/big"

// A factor is what one step, or the mixing of a powder, makes of the
// concentration before it: drawn / (plus - minus), or, where what is drawn
// counts into the volume too, drawn / (drawn + plus - minus). A powder draws
// nothing and has scale, its stated volume, for drawn. A numerator rises, plus
// falls, minus rises: so the ends lie where each input is at a limit.
type factor struct {
	scale       *big.Rat
	drawn       []input
	counted     bool
	plus, minus []input
}

// taken is the numerator, volume the denominator, both in mL.
func (f factor) taken(c corner) *big.Rat {
	if f.scale != nil {
		return f.scale
	}
	return sum(f.drawn, c)
}

func (f factor) volume(c corner) *big.Rat {
	v := new(big.Rat).Sub(sum(f.plus, c), sum(f.minus, c))
	if f.counted {
		v.Add(v, sum(f.drawn, c))
	}
	return v
}

func sum(list []input, c corner) *big.Rat {
	total := new(big.Rat)
	for _, x := range list {
		total.Add(total, x.at(c))
	}
	return total
}

// at is the factor in a corner. What is drawn and counted is at the same limit
// above and below, being one volume.
func (f factor) at(c corner) *big.Rat { return new(big.Rat).Quo(f.taken(c), f.volume(c)) }

// A width is by how much, as a share, the concentration may be off through one
// input: sensitivity times half width, both relative, at the middle.
type width struct {
	source Source
	share  *big.Rat
}

func (f factor) widths() []width {
	per := new(big.Rat).Inv(f.volume(middle))
	var out []width
	if f.scale == nil {
		reach := new(big.Rat).Inv(f.taken(middle))
		if f.counted {
			reach.Sub(reach, per)
		}
		out = append(out, widthsOf(f.drawn, reach)...)
	}
	return append(append(out, widthsOf(f.plus, per)...), widthsOf(f.minus, per)...)
}

func widthsOf(list []input, reach *big.Rat) []width {
	var out []width
	for _, x := range list {
		out = append(out, width{x.source, new(big.Rat).Mul(reach, x.half())})
	}
	return out
}

// inputs are all inputs of the factor.
func (f factor) inputs() []input {
	return append(append(append([]input{}, f.drawn...), f.plus...), f.minus...)
}

// mixing is the factor of a powder, nil if there is none. It refuses a powder
// without a volume.
func mixing(p *Powder) ([]factor, error) {
	if p == nil {
		return nil, nil
	}
	added, err := reading(p.Added, PowderFluid, 0, false)
	if err != nil {
		return nil, err
	}
	own, err := fill(p.Displaced, Displacement, 0)
	if err != nil {
		return nil, err
	}
	f := factor{plus: []input{added, own}}
	f.scale = f.volume(stated)
	return []factor{f}, nil
}

// factor works the sum of step number n.
func (s Step) factor(n int) (factor, error) {
	var f factor
	var err error
	if f.drawn, err = readings(s.drawn, DrugDrawn, n, true); err != nil {
		return f, err
	}
	switch s.way {
	case makeUpTo:
		f.plus, err = readings(s.others, FinalVolume, n, false)
	case addDiluent:
		f.counted = true
		f.plus, err = readings(s.others, DiluentAdded, n, false)
	case addToBag, withdrawThenAdd:
		f.counted = true
		f.plus, f.minus, err = s.inBag(n)
	}
	return f, err
}

// inBag is what the bag holds and what is withdrawn from it.
func (s Step) inBag(n int) (plus, minus []input, err error) {
	bag, err := fill(s.bag, BagFill, n)
	if err != nil {
		return nil, nil, err
	}
	plus = []input{bag}
	if s.way == withdrawThenAdd {
		if minus, err = readings(s.removed, FluidRemoved, n, true); err != nil {
			return nil, nil, err
		}
	}
	if bag.stated.Sign() == 0 || bag.low.Sign() == 0 {
		return nil, nil, wrong(bag.source, "0 mL", "a volume above zero")
	}
	if sum(minus, highest).Cmp(bag.low) > 0 {
		return nil, nil, wrong(minus[0].source, "up to "+exactly(sum(minus, highest)),
			"no more than the bag holds, "+exactly(bag.low))
	}
	return plus, minus, nil
}
