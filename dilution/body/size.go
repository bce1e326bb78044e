package body

import (
	"math/big"

	"drawup/dilution/quantity"
)

// A Size is what is known about a person's body. Every field may be missing;
// each equation says what it needs.
type Size struct {
	Sex    Sex
	Age    Age
	Height quantity.Length
	Weight quantity.BodyWeight
}

// Names of the equations, as errors and notes print them.
const (
	devine        = "ideal weight (Devine 1974)"
	adjusted      = "adjusted weight (ideal and 0.4 of the excess)"
	janmahasatian = "lean weight (Janmahasatian 2005)"
	james         = "lean weight (James 1976)"
	boer          = "lean weight (Boer 1984)"
	bodyMassIndex = "body mass index"
	mostellerArea = "surface area (Mosteller 1987)"
	duBoisArea    = "surface area (Du Bois 1916)"
)

// rat is the fraction a/b.
func rat(a, b int64) *big.Rat { return big.NewRat(a, b) }

func add(x, y *big.Rat) *big.Rat { return new(big.Rat).Add(x, y) }
func sub(x, y *big.Rat) *big.Rat { return new(big.Rat).Sub(x, y) }
func mul(x, y *big.Rat) *big.Rat { return new(big.Rat).Mul(x, y) }
func quo(x, y *big.Rat) *big.Rat { return new(big.Rat).Quo(x, y) }

// need finds the first value that equation lacks.
func (s Size) need(equation string, values ...Value) error {
	for _, v := range values {
		var there bool
		switch v {
		case NeedSex:
			there = s.Sex == Female || s.Sex == Male
		case NeedAge:
			there = s.Age.Given()
		case NeedHeight:
			there = s.Height.Given() && s.Height.Rat().Sign() > 0
		case NeedWeight:
			there = s.Weight.Given() && s.Weight.Rat().Sign() > 0
		}
		if !there {
			return &MissingError{Equation: equation, What: v}
		}
	}
	return nil
}

// bySex chooses a coefficient. The sex must have been asked for with need.
func (s Size) bySex(man, woman *big.Rat) *big.Rat {
	if s.Sex == Male {
		return man
	}
	return woman
}

// adult refuses a person known to be under 18 years. An age that is not given
// passes here and is a [Note].
func (s Size) adult(equation string) error {
	if !s.Age.Given() || s.Age.Years() >= adultYears {
		return nil
	}
	return &OutsideEquation{Equation: equation,
		Reason: "age " + s.Age.String() + ", but the equation is for adults from 18 years: it is not validated in children",
		Source: childSource}
}

// positive refuses a weight of zero or less, which an equation gives far
// outside its range.
func positive(equation, reason string, kg *big.Rat) (quantity.BodyWeight, error) {
	if kg.Sign() <= 0 {
		return quantity.BodyWeight{}, &OutsideEquation{Equation: equation, Reason: reason, Source: "follows from the equation itself"}
	}
	return quantity.Kilograms(kg), nil
}

// Ideal is the ideal weight after Devine 1974, exact: men 50 kg, women 45.5 kg,
// and 2.3 kg for every inch (2.54 cm) of height over 60. It needs sex and
// height. Under 152.4 cm it extrapolates ([Size.Notes]). Errors:
// *MissingError; *OutsideEquation under 18 years or where the rule gives no
// weight above zero.
func (s Size) Ideal() (quantity.BodyWeight, error) {
	if err := s.need(devine, NeedSex, NeedHeight); err != nil {
		return quantity.BodyWeight{}, err
	}
	if err := s.adult(devine); err != nil {
		return quantity.BodyWeight{}, err
	}
	inches := quo(s.Height.Rat(), rat(254, 100))
	kg := add(s.bySex(rat(50, 1), rat(455, 10)), mul(rat(23, 10), sub(inches, rat(60, 1))))
	return positive(devine, "height "+s.Height.Exact()+" cm gives no weight above zero", kg)
}

// Adjusted is ideal + 0.4 (actual - ideal), from the unrounded ideal weight; it
// is the actual weight where that is below the ideal one. It needs sex, height
// and weight. Errors as for [Size.Ideal].
func (s Size) Adjusted() (quantity.BodyWeight, error) {
	if err := s.need(adjusted, NeedSex, NeedHeight, NeedWeight); err != nil {
		return quantity.BodyWeight{}, err
	}
	if err := s.adult(adjusted); err != nil {
		return quantity.BodyWeight{}, err
	}
	ideal, err := s.Ideal()
	if err != nil {
		return quantity.BodyWeight{}, err
	}
	return s.AdjustedFrom(ideal)
}

// BMI is weight over height squared in kg/m², exact. Error: *MissingError.
func (s Size) BMI() (*big.Rat, error) {
	if err := s.need(bodyMassIndex, NeedHeight, NeedWeight); err != nil {
		return nil, err
	}
	m := quo(s.Height.Rat(), rat(100, 1))
	return quo(s.Weight.Rat(), mul(m, m)), nil
}

// Lean is the lean weight after Janmahasatian 2005, exact: men 9270 W / (6680 +
// 216 BMI), women 9270 W / (8780 + 244 BMI). It needs sex, height and weight.
// Errors: *MissingError; *OutsideEquation under 18 years.
func (s Size) Lean() (quantity.BodyWeight, error) {
	if err := s.need(janmahasatian, NeedSex, NeedHeight, NeedWeight); err != nil {
		return quantity.BodyWeight{}, err
	}
	if err := s.adult(janmahasatian); err != nil {
		return quantity.BodyWeight{}, err
	}
	bmi, err := s.BMI()
	if err != nil {
		return quantity.BodyWeight{}, err
	}
	below := add(s.bySex(rat(6680, 1), rat(8780, 1)), mul(s.bySex(rat(216, 1), rat(244, 1)), bmi))
	return quantity.Kilograms(quo(mul(rat(9270, 1), s.Weight.Rat()), below)), nil
}

// James is the lean weight after James 1976, exact: men 1.10 W - 128 (W/H)²,
// women 1.07 W - 148 (W/H)². It needs sex, height and weight. It has a maximum
// ([Size.Notes]) and then falls. Errors: *MissingError; *OutsideEquation under
// 18 years or where the equation gives no weight above zero.
func (s Size) James() (quantity.BodyWeight, error) {
	if err := s.need(james, NeedSex, NeedHeight, NeedWeight); err != nil {
		return quantity.BodyWeight{}, err
	}
	if err := s.adult(james); err != nil {
		return quantity.BodyWeight{}, err
	}
	w := s.Weight.Rat()
	ratio := quo(w, s.Height.Rat())
	kg := sub(mul(s.bySex(rat(110, 100), rat(107, 100)), w), mul(s.bySex(rat(128, 1), rat(148, 1)), mul(ratio, ratio)))
	return positive(james, "so far past its maximum it gives no weight above zero", kg)
}

// Boer is the lean weight after Boer 1984, exact: men 0.407 W + 0.267 H - 19.2,
// women 0.252 W + 0.473 H - 48.3. It needs sex, height and weight. Errors:
// *MissingError; *OutsideEquation under 18 years or where the equation gives
// no weight above zero.
func (s Size) Boer() (quantity.BodyWeight, error) {
	if err := s.need(boer, NeedSex, NeedHeight, NeedWeight); err != nil {
		return quantity.BodyWeight{}, err
	}
	if err := s.adult(boer); err != nil {
		return quantity.BodyWeight{}, err
	}
	kg := sub(add(mul(s.bySex(rat(407, 1000), rat(252, 1000)), s.Weight.Rat()),
		mul(s.bySex(rat(267, 1000), rat(473, 1000)), s.Height.Rat())), s.bySex(rat(192, 10), rat(483, 10)))
	return positive(boer, "height and weight are too small for it", kg)
}
