package body

import "drawup/dilution/quantity"

const childIdeal = "ideal weight of a child (1.65 height² / 1000, from 60 inches on by the inch)"

// ChildIdealSource is where the ideal weight of children comes from; the
// equation's first author was not seen.
const ChildIdealSource = "clinPK 0.14.0, R package, 2024, for 1 to 17 years"

// ChildIdeal is the ideal weight of a child from 1 to 17 years, exact, H in cm:
// under 60 inches (152.4 cm) 1.65 H²/1000 kg; from there on 39 kg for boys, 42.2
// kg for girls, and 2.27 kg for every inch over 60. It needs age and height, and
// from 60 inches on the sex. Errors: *MissingError; *OutsideEquation under 1
// year and from 18 years on.
func (s Size) ChildIdeal() (quantity.BodyWeight, error) {
	if err := s.need(childIdeal, NeedAge, NeedHeight); err != nil {
		return quantity.BodyWeight{}, err
	}
	if y := s.Age.Years(); y < 1 || y >= adultYears {
		return quantity.BodyWeight{}, &OutsideEquation{Equation: childIdeal,
			Reason: "age " + s.Age.String() + ", but the equation is for 1 to 17 years", Source: ChildIdealSource}
	}
	h := s.Height.Rat()
	over := sub(quo(h, rat(254, 100)), rat(60, 1))
	if over.Sign() < 0 {
		return quantity.Kilograms(quo(mul(rat(165, 100), mul(h, h)), rat(1000, 1))), nil
	}
	if err := s.need(childIdeal, NeedSex); err != nil {
		return quantity.BodyWeight{}, err
	}
	return quantity.Kilograms(add(s.bySex(rat(39, 1), rat(422, 10)), mul(rat(227, 100), over))), nil
}

// AdjustedFrom is the adjusted weight from an ideal weight that was worked
// elsewhere: ideal + 0.4 (actual - ideal), exact; the actual weight where that
// is below the ideal one. It needs the weight. Error: *MissingError.
func (s Size) AdjustedFrom(ideal quantity.BodyWeight) (quantity.BodyWeight, error) {
	if err := s.need(adjusted, NeedWeight); err != nil {
		return quantity.BodyWeight{}, err
	}
	if !ideal.Given() || ideal.Rat().Sign() <= 0 {
		return quantity.BodyWeight{}, &MissingError{Equation: adjusted, What: "ideal weight"}
	}
	if s.Weight.Cmp(ideal) < 0 {
		return s.Weight, nil
	}
	excess := sub(s.Weight.Rat(), ideal.Rat())
	return quantity.Kilograms(add(ideal.Rat(), mul(rat(4, 10), excess))), nil
}
