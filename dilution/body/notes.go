package body

import "math/big"

// A Note is a caution about a weight that still stands. Code is one of the
// refusal catalogue's: "body-size-outside-equation",
// "lean-weight-above-plateau", "age-missing".
type Note struct {
	Code   string
	Text   string
	Source string
}

const (
	outside = "body-size-outside-equation"
	plateau = "lean-weight-above-plateau"
	noAge   = "age-missing"
)

const adultYears = 18

// Sources that errors and notes name.
const (
	childSource   = "size descriptors in obesity, table 2, Arch Dis Child Educ Pract (lean weight not validated in children); clinPK 0.14.0, R package, 2024 (Devine rule not used from 1 to 17 years)"
	devineSource  = "the rule itself counts inches over 60; that it was derived from 60 inches up is common knowledge without a source seen"
	leanSource    = "Janmahasatian et al., Clin Pharmacokinet 2005;44:1051-1065 (range of the index set)"
	jamesSource   = "follows from the equation; its fall in obesity: Nyman, Radiology 2016;278:956-957"
	plateauSource = "secondary pages quoting the Association of Anaesthetists of Great Britain and Ireland 2015 obesity guideline; the original sentence was not seen"
)

// Notes lists every caution for this body: for ideal, adjusted and lean
// weight, and for the James lean weight. Values that are missing give none.
func (s Size) Notes() []Note {
	list := append(s.ageNotes(), s.devineNotes()...)
	list = append(list, s.leanNotes()...)
	return append(list, s.jamesNotes()...)
}

// NotesFor lists the cautions for a dose that goes by kind: none for actual
// weight, surface area and absolute doses.
func (s Size) NotesFor(kind Kind) []Note {
	switch kind {
	case Ideal, Adjusted:
		return append(s.ageNotes(), s.devineNotes()...)
	case Lean:
		return append(s.ageNotes(), s.leanNotes()...)
	case Actual, Surface, None:
		return nil
	}
	return nil
}

func (s Size) ageNotes() []Note {
	if s.Age.Given() {
		return nil
	}
	return []Note{{noAge, "age not given: ideal, adjusted and lean weight hold for adults from 18 years only", childSource}}
}

// devineNotes compares with 60 inches, 152.4 cm exactly.
func (s Size) devineNotes() []Note {
	if s.need(devine, NeedSex, NeedHeight) != nil || s.adult(devine) != nil {
		return nil
	}
	if s.Height.Rat().Cmp(rat(1524, 10)) >= 0 {
		return nil
	}
	return []Note{{outside, "height " + s.Height.Exact() + " cm is below 152.4 cm (60 inches): the ideal weight by the Devine rule is extrapolated", devineSource}}
}

// leanNotes holds the index set of the Janmahasatian equation against this
// body, and the plateau that the guideline is said to give.
func (s Size) leanNotes() []Note {
	lean, err := s.Lean()
	if err != nil {
		return nil
	}
	bmi, err := s.BMI()
	if err != nil {
		return nil
	}
	var list []Note
	if w := s.Weight.Rat(); w.Cmp(rat(407, 10)) < 0 || w.Cmp(rat(2165, 10)) > 0 {
		list = append(list, Note{outside, "weight " + s.Weight.Exact() + " kg is outside 40.7 to 216.5 kg, the people behind the lean weight equation", leanSource})
	}
	if bmi.Cmp(rat(171, 10)) < 0 || bmi.Cmp(rat(699, 10)) > 0 {
		list = append(list, Note{outside, "BMI " + tenth(bmi) + " kg/m² is outside 17.1 to 69.9, the people behind the lean weight equation", leanSource})
	}
	if s.Age.Given() && s.Age.Years() > 82 {
		list = append(list, Note{outside, "age " + s.Age.String() + " is outside 18 to 82 years, the people behind the lean weight equation", leanSource})
	}
	limit := s.bySex(rat(100, 1), rat(70, 1))
	if lean.Rat().Cmp(limit) > 0 {
		list = append(list, Note{plateau, "lean weight is above " + limit.RatString() + " kg, rarely exceeded whatever the total weight; it is not cut off", plateauSource})
	}
	return list
}

// jamesNotes finds the maximum of the James equation: with R = W/H the weight
// a W - b R² falls from W = a H²/(2 b) on. It is compared exactly, not with
// the rounded BMI 42.97 (men) and 36.15 (women).
func (s Size) jamesNotes() []Note {
	if s.need(james, NeedSex, NeedHeight, NeedWeight) != nil || s.adult(james) != nil {
		return nil
	}
	h, w := s.Height.Rat(), s.Weight.Rat()
	top := quo(mul(s.bySex(rat(110, 100), rat(107, 100)), mul(h, h)), s.bySex(rat(256, 1), rat(296, 1)))
	if w.Cmp(top) <= 0 {
		return nil
	}
	text := "the James lean weight is past its maximum at BMI 42.97 (men) or 36.15 (women) and falls as weight rises"
	return []Note{{outside, text, jamesSource}}
}

// tenth is r half up to one decimal, for words only.
func tenth(r *big.Rat) string { return halfUp(r, rat(1, 10)).FloatString(1) }
