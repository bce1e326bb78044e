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
//   - half to twice the weight by age, outside which a caution is given: pounds
//     for kilograms, 30.8 kg for 14 kg at 3 years, are 2.2 times the middle;
//   - a body mass index of 9 to 35 under 13 years: 14 kg with the digits swapped,
//     41 kg, at 97 cm give 44. In the first month only the upper bound holds: a
//     child born early, 0.6 kg and 30 cm, has 6.7;
//   - 25 to 350 kg from 13 years on, and a body mass index of 10 to 90: a height
//     and weight swapped, 178 kg and 72 cm, give 343.
const (
	netSource = "our own wide net against slips of the pen; no source gives such bounds"
	apls      = "weight by age of Advanced Paediatric Life Support, 2011: 0.5 × months + 4 kg at 1 to 12 months, 2 × years + 8 kg at 1 to 5 years, 3 × years + 7 kg at 6 to 12 years; a third to three times of it, and half to twice for a caution, are our own nets"
)

// childYears is the age from which the bounds of grown people hold.
const childYears = 13

// plausible refuses body values that no body has, and values that do not fit
// each other. A child's weight that passes and is far from the middle of its
// age gets a caution.
func (r *reader) plausible(path []any, p Patient) {
	weighed := p.Weight.Value.Given() && r.within(at(path, "weight"), p.Weight.Text, p.Weight.Value.Rat(),
		big.NewRat(3, 10), big.NewRat(400, 1), refusal.WeightImplausible, "kg")
	tall := p.Height.Value.Given() && r.within(at(path, "height"), p.Height.Text, p.Height.Value.Rat(),
		big.NewRat(25, 1), big.NewRat(250, 1), refusal.HeightImplausible, "cm")
	fits := weighed
	if weighed && p.Age.Value.Given() {
		fits = r.weightForAge(path, p)
	}
	if weighed && tall {
		fits = r.massIndex(path, p) && fits
	}
	if fits && p.Age.Value.Given() {
		r.farFromMiddle(path, p)
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
func (r *reader) weightForAge(path []any, p Patient) bool {
	low, high, source := big.NewRat(25, 1), big.NewRat(350, 1), netSource
	if p.Age.Value.Years() < childYears {
		low, high = aroundMiddle(p.Age.Value, 3)
		source = apls
	}
	want, ok := held(p.Weight.Value.Rat(), low, high)
	if ok {
		return true
	}
	r.refuse(at(path, "weight"), refusal.Reason{
		Code: refusal.BodyValuesStrange, Got: p.Weight.Text + " at " + p.Age.Text, Source: source,
		Want:    want,
		Message: fmt.Sprintf("a weight of %s does not fit an age of %s", p.Weight.Text, p.Age.Text),
		Remedy:  "check the weight, its unit and the age",
	})
	return false
}

// farFromMiddle cautions when a child weighs less than half or more than twice
// the middle weight of its age. It concerns the patient, not one syringe.
func (r *reader) farFromMiddle(path []any, p Patient) {
	if p.Age.Value.Years() >= childYears {
		return
	}
	low, high := aroundMiddle(p.Age.Value, 2)
	want, ok := held(p.Weight.Value.Rat(), low, high)
	if ok {
		return
	}
	// The message is printed. It names no patient: an id such as "B7" is a figure
	// on paper that no sum confirms.
	r.caution(at(path, "weight"), refusal.Reason{
		Code: refusal.WeightImplausible, Got: p.Weight.Text + " at " + p.Age.Text, Source: apls, Want: want,
		Message: fmt.Sprintf("a weight of %s is far from the middle for an age of %s; doses by weight may go wrong by as much", p.Weight.Text, p.Age.Text),
		Remedy:  "check that it is in kg and not in pounds, that its digits are in order, and the age",
	})
}

// aroundMiddle is from the share-th part of the middle weight to share times it,
// in kg; low is nothing in the first month.
func aroundMiddle(a body.Age, share int64) (low, high *big.Rat) {
	middle, firstMonth := weightByAge(a)
	low, high = new(big.Rat).Quo(middle, big.NewRat(share, 1)), new(big.Rat).Mul(middle, big.NewRat(share, 1))
	if firstMonth {
		low = new(big.Rat)
	}
	return low, high
}

// held reports whether w lies from low to high, in kg, and says what is wanted.
func held(w, low, high *big.Rat) (want string, ok bool) {
	want = fmt.Sprintf("%s to %s kg at this age", plain(low), plain(high))
	if low.Sign() == 0 {
		want = fmt.Sprintf("at most %s kg at this age", plain(high))
	}
	return want, w.Cmp(low) >= 0 && w.Cmp(high) <= 0
}

// weightByAge is the middle weight in kg of a child under 13 years.
// firstMonth says that the child is too young for the rule; the weight is then
// the one that the rule gives at one month.
func weightByAge(a body.Age) (kg *big.Rat, firstMonth bool) {
	if middle, err := body.APLS2011.Guess(a); err == nil {
		return middle.Weight.Rat(), false
	}
	return big.NewRat(9, 2), true
}

// massIndex refuses a body mass index, weight in kg by the square of height in
// m, that no body has: above 90 at any age, below 10 from 13 years on, outside 9
// to 35 under 13 years, with no lower bound in the first month.
func (r *reader) massIndex(path []any, p Patient) bool {
	metres := new(big.Rat).Quo(p.Height.Value.Rat(), big.NewRat(100, 1))
	index := new(big.Rat).Quo(p.Weight.Value.Rat(), new(big.Rat).Mul(metres, metres))
	low, high := indexBounds(p)
	if index.Cmp(low) >= 0 && index.Cmp(high) <= 0 {
		return true
	}
	want := fmt.Sprintf("a body mass index of %s to %s", plain(low), plain(high))
	if low.Sign() == 0 {
		want = fmt.Sprintf("a body mass index of at most %s", plain(high))
	}
	r.refuse(at(path, "height"), refusal.Reason{
		Code: refusal.BodyValuesStrange, Got: fmt.Sprintf("%s and %s, body mass index %s", p.Weight.Text, p.Height.Text, plain(index)),
		Want: want, Source: netSource,
		Message: fmt.Sprintf("a weight of %s and a height of %s do not fit each other", p.Weight.Text, p.Height.Text),
		Remedy:  "check both figures and their units, and that they are not swapped",
	})
	return false
}

// indexBounds are those of the body mass index at the patient's age. low is
// nothing where no lower bound holds.
func indexBounds(p Patient) (low, high *big.Rat) {
	switch {
	case !p.Age.Value.Given():
		return new(big.Rat), big.NewRat(90, 1)
	case p.Age.Value.Years() >= childYears:
		return big.NewRat(10, 1), big.NewRat(90, 1)
	}
	if _, firstMonth := weightByAge(p.Age.Value); firstMonth {
		return new(big.Rat), big.NewRat(35, 1)
	}
	return big.NewRat(9, 1), big.NewRat(35, 1)
}
