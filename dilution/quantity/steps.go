package quantity

import "math/big"

// ToStep moves v to a multiple of step and says what was lost: the moved
// volume minus v, as a share of v in per cent (rule R2). Error: *NotGivenError
// for a value, step or direction that is missing.
func (v Volume) ToStep(step Volume, d Direction) (Volume, *big.Rat, error) {
	x, err := v.x.toStep(step.x, d)
	if err != nil {
		return Volume{}, nil, err
	}
	return Volume{x: x}, lost(v.x, x), nil
}

// ToStep moves f to the pump's step and says what was lost, as [Volume.ToStep]
// does.
func (f FlowRate) ToStep(step FlowRate, d Direction) (FlowRate, *big.Rat, error) {
	x, err := f.x.toStep(step.x, d)
	if err != nil {
		return FlowRate{}, nil, err
	}
	return FlowRate{x: x}, lost(f.x, x), nil
}

// ToStep moves w to a multiple of step kilograms. Error: *NotGivenError for a value,
// step or direction that is missing.
func (w BodyWeight) ToStep(step *big.Rat, d Direction) (BodyWeight, error) {
	x, err := w.x.toStep(fromRat(step), d)
	return BodyWeight{x: x}, err
}

// ToStep moves s to a multiple of step square metres. Error: *NotGivenError for a value,
// step or direction that is missing.
func (s BodySurfaceArea) ToStep(step *big.Rat, d Direction) (BodySurfaceArea, error) {
	x, err := s.x.toStep(fromRat(step), d)
	return BodySurfaceArea{x: x}, err
}

// ToStep moves p to a multiple of step per cent. Error: *NotGivenError for a value,
// step or direction that is missing.
func (p Percent) ToStep(step *big.Rat, d Direction) (Percent, error) {
	x, err := p.x.toStep(fromRat(step), d)
	return Percent{x: x}, err
}

// lost is after minus before, as a share of before in per cent.
func lost(before, after exact) *big.Rat {
	if before.sign() == 0 {
		return new(big.Rat)
	}
	return after.sub(before).quo(before).mul(whole(100)).r
}
