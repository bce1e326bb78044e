package body

import (
	"fmt"
	"math/big"
	"strings"

	"drawup/dilution/quantity"
)

// An AgeRule is a published rule that guesses a child's weight from the age,
// for when the child cannot be weighed. The zero value means "not given".
type AgeRule int

// Rules by age, named as they were published.
const (
	APLS2011 AgeRule = iota + 1
	APLSOld
	LuscombeOwens
	Erker
)

// AgeRules lists the rules, the one in present use first.
func AgeRules() []AgeRule { return []AgeRule{APLS2011, LuscombeOwens, APLSOld, Erker} }

// An Estimate is a weight guessed from an age. It is never a measurement.
type Estimate struct {
	Weight   quantity.BodyWeight
	Ages     string // the ages that the equation holds for: "1 to 5 years"
	Equation string // "2 x years + 8"
	Source   string
	Known    string // how far off it was found
}

// A band is one equation of a rule: kg = a n + b over whole months or years.
type band struct {
	ages     string // as published
	from, to int    // completed, both included
	months   bool
	a, b     *big.Rat
	equation string
}

// A published rule: its name, its bands and what is known of it. A rule whose
// source was not seen to name the ages has no bands and gives no weight.
type published struct {
	name, source, known string
	bands               []band
}

const (
	aplsSource = "Advanced Paediatric Life Support course since 2011, as given by Marikar, BMJ Innov 2015, " +
		"doi:10.1136/bmjinnov-2015-000059"
	luscombeSource = "Luscombe and Owens, Arch Dis Child 2007;92:412, made from 17,244 children of 1 to 10 years"
	erkerSource    = "Erker et al., Resuscitation 2014;85:1174-1178"
)

func (r AgeRule) published() published {
	years := func(from, to int, a, b int64, equation string) band {
		return band{fmt.Sprintf("%d to %d years", from, to), from, to, false, rat(a, 1), rat(b, 1), equation}
	}
	switch r {
	case APLS2011:
		return published{"APLS 2011", aplsSource, "it jumps from 18 kg at 5 years to 25 kg at 6 years", []band{
			// 12 months are 1 year here: both equations give 10 kg.
			{"1 to 12 months", 1, 11, true, rat(1, 2), rat(4, 1), "0.5 x completed months + 4"},
			years(1, 5, 2, 8, "2 x completed years + 8"), years(6, 12, 3, 7, "3 x completed years + 7"),
		}}
	case APLSOld:
		return published{"APLS before 2011", luscombeSource + ", which held this older rule against them",
			"it read a mean 18.8 % too low in 17,244 children of a UK city", []band{years(1, 10, 2, 8, "2 x (completed years + 4)")}}
	case LuscombeOwens:
		return published{"Luscombe-Owens 2007", luscombeSource,
			"it read a mean 2.5 % too low in the children it was made from; in South African children the older rule was nearer (BMC Emerg Med 2012;12:9)",
			[]band{years(1, 10, 3, 7, "3 x completed years + 7")}}
	case Erker:
		return published{name: "Erker 2014", source: erkerSource}
	}
	return published{}
}

// String is the rule's published name, "" if not given.
func (r AgeRule) String() string { return r.published().name }

// Ages is the ages that the rule holds for in words: "1 to 12 months, 1 to 5
// years, 6 to 12 years"; "" where its source was not seen to name them.
func (r AgeRule) Ages() string {
	var out []string
	for _, b := range r.published().bands {
		out = append(out, b.ages)
	}
	return strings.Join(out, ", ")
}

// AgeRuleNamed reads a published name in any letter case.
func AgeRuleNamed(s string) (AgeRule, bool) {
	for _, r := range AgeRules() {
		if strings.EqualFold(strings.Join(strings.Fields(s), " "), r.String()) {
			return r, true
		}
	}
	return 0, false
}

// Guess is the weight that the rule gives for an age, exact, by completed
// months under one year and completed years from then on. Errors: *MissingError
// without an age; *OutsideEquation outside the rule's ages.
func (r AgeRule) Guess(age Age) (Estimate, error) {
	p := r.published()
	equation := "weight by age (" + p.name + ")"
	if !age.Given() {
		return Estimate{}, &MissingError{Equation: equation, What: NeedAge}
	}
	if len(p.bands) == 0 {
		return Estimate{}, &OutsideEquation{Equation: equation, Source: p.source,
			Reason: "the ages that the rule is for were not seen in its source, so no weight is worked"}
	}
	for _, b := range p.bands {
		n := age.Years()
		if b.months {
			n = age.Months()
		}
		if n < b.from || n > b.to {
			continue
		}
		kg := add(mul(b.a, rat(int64(n), 1)), b.b)
		return Estimate{quantity.Kilograms(kg), b.ages, b.equation, p.source, p.known}, nil
	}
	return Estimate{}, &OutsideEquation{Equation: equation, Source: p.source,
		Reason: "age " + age.String() + ", but the rule is for " + r.Ages()}
}
