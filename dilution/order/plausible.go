package order

import (
	"fmt"
	"math/big"

	"drawup/dilution/body"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// The nets below are wide and our own: they catch slips (pounds for kilograms,
// grams for kilograms, a point left out, weight and height swapped), they do
// not judge a body. No source gives such bounds. Their basis:
//
//   - 0.3 to 400 kg and 25 to 250 cm hold every patient from the smallest
//     newborn who is treated to the largest adult;
//   - a third to three times the weight by age: a factor of 2.2 (pounds) passes
//     only for a child already far from the middle, a factor of ten never;
//   - 25 to 350 kg from 13 years on, and a body mass index of 10 to 90: a height
//     and weight swapped, 178 kg and 72 cm, give 343.
const (
	netSource = "our own wide net against slips of the pen; no source gives such bounds"
	apls      = "weight by age of Advanced Paediatric Life Support, 2011: 0.5 × months + 4 kg at 1 to 12 months, 2 × years + 8 kg at 1 to 5 years, 3 × years + 7 kg at 6 to 12 years; a third to three times of it is our own net"
)

// plausible refuses body values that no body has, and values that do not fit
// each other.
func (r *reader) plausible(path []any, p Patient) {
	weighed := p.Weight.Value.Given() && r.within(at(path, "weight"), p.Weight.Text, p.Weight.Value.Rat(),
		big.NewRat(3, 10), big.NewRat(400, 1), refusal.WeightImplausible, "kg")
	tall := p.Height.Value.Given() && r.within(at(path, "height"), p.Height.Text, p.Height.Value.Rat(),
		big.NewRat(25, 1), big.NewRat(250, 1), refusal.HeightImplausible, "cm")
	if weighed && p.Age.Value.Given() {
		r.weightForAge(path, p)
	}
	if weighed && tall {
		r.massIndex(path, p)
	}
}

// within refuses a value outside low to high.
func (r *reader) within(path []any, text string, x, low, high *big.Rat, code refusal.Code, unit string) bool {
	if x.Cmp(low) >= 0 && x.Cmp(high) <= 0 {
		return true
	}
	want := fmt.Sprintf("%s to %s %s", plain(low), plain(high), unit)
	r.refuse(path, refusal.Reason{Code: code, Got: text, Want: want, Source: netSource,
		Message: fmt.Sprintf("a %s of %s is not that of a patient", key(path), text), Remedy: "check the figure and its unit"})
	return false
}

func plain(x *big.Rat) string { return quantity.UK().Number(x) }

// weightForAge refuses a weight that does not fit the age. Under one month the
// rule is not defined, and a child born early may weigh far less than a third
// of its least figure: there only the upper bound of one month holds.
func (r *reader) weightForAge(path []any, p Patient) {
	low, high, source := big.NewRat(25, 1), big.NewRat(350, 1), netSource
	if p.Age.Value.Years() < 13 {
		middle, firstMonth := weightByAge(p.Age.Value)
		low, high, source = new(big.Rat).Quo(middle, big.NewRat(3, 1)), new(big.Rat).Mul(middle, big.NewRat(3, 1)), apls
		if firstMonth {
			low = new(big.Rat)
		}
	}
	want := fmt.Sprintf("%s to %s kg at this age", plain(low), plain(high))
	if low.Sign() == 0 {
		want = fmt.Sprintf("at most %s kg at this age", plain(high))
	}
	w := p.Weight.Value.Rat()
	if w.Cmp(low) >= 0 && w.Cmp(high) <= 0 {
		return
	}
	r.refuse(at(path, "weight"), refusal.Reason{
		Code: refusal.BodyValuesStrange, Got: p.Weight.Text + " at " + p.Age.Text, Source: source,
		Want:    want,
		Message: fmt.Sprintf("a weight of %s does not fit an age of %s", p.Weight.Text, p.Age.Text),
		Remedy:  "check the weight, its unit and the age",
	})
}

// weightByAge is the middle weight in kg of a child under 13 years.
// firstMonth says that the child is too young for the rule; the weight is then
// the one that the rule gives at one month.
func weightByAge(a body.Age) (kg *big.Rat, firstMonth bool) {
	switch y := int64(a.Years()); {
	case y >= 6:
		return big.NewRat(3*y+7, 1), false
	case y >= 1:
		return big.NewRat(2*y+8, 1), false
	}
	for m := int64(11); m >= 1; m-- {
		if bound, err := body.ParseAge(fmt.Sprintf("%d months", m)); err == nil && !a.Less(bound) {
			return big.NewRat(m+8, 2), false
		}
	}
	return big.NewRat(9, 2), true
}

// massIndex refuses a body mass index above 90 at any age, and one below 10
// from 13 years on: weight in kg by the square of height in m.
func (r *reader) massIndex(path []any, p Patient) {
	metres := new(big.Rat).Quo(p.Height.Value.Rat(), big.NewRat(100, 1))
	index := new(big.Rat).Quo(p.Weight.Value.Rat(), new(big.Rat).Mul(metres, metres))
	low, high := big.NewRat(10, 1), big.NewRat(90, 1)
	grown := p.Age.Value.Given() && p.Age.Value.Years() >= 13
	if index.Cmp(high) <= 0 && (!grown || index.Cmp(low) >= 0) {
		return
	}
	want := "a body mass index of at most 90"
	if grown {
		want = "a body mass index of 10 to 90"
	}
	r.refuse(at(path, "height"), refusal.Reason{
		Code: refusal.BodyValuesStrange, Got: fmt.Sprintf("%s and %s, body mass index %s", p.Weight.Text, p.Height.Text, plain(index)),
		Want: want, Source: netSource,
		Message: fmt.Sprintf("a weight of %s and a height of %s do not fit each other", p.Weight.Text, p.Height.Text),
		Remedy:  "check both figures and their units, and that they are not swapped",
	})
}
