package main

import (
	"fmt"
	"math/big"

	"drawup/dilution/body"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// The nets are those of order files: wide, our own, made to catch slips such as
// grams for kilograms or height and weight swapped. No source gives them.
const (
	netSource  = "our own wide net against slips of the pen; no source gives such bounds"
	lightest   = 3   // 0.3 kg, in tenths
	heaviest   = 400 // kg
	shortest   = 25  // cm
	tallest    = 250 // cm
	thinnest   = 5   // kg/m², a child born early included
	widestBody = 90  // kg/m²
)

// readWeight is --weight, refused when no patient weighs so much or so little.
func readWeight(r *request) quantity.BodyWeight {
	return readWeightFlag(r, "weight")
}

// readWeightFlag is the body weight of a flag.
func readWeightFlag(r *request, name string) quantity.BodyWeight {
	w := read(r, name, quantity.ParseAnyBodyWeight)
	if !w.Given() {
		return w
	}
	if x := w.Rat(); x.Cmp(big.NewRat(lightest, 10)) < 0 || x.Cmp(big.NewRat(heaviest, 1)) > 0 {
		r.strange(name, refusal.WeightImplausible, "0.3 to 400 kg", "is not the weight of a patient")
	}
	return w
}

// readHeight is --height, refused when no patient is so tall or so short.
func readHeight(r *request) quantity.Length {
	h := read(r, "height", quantity.ParseAnyLength)
	if !h.Given() {
		return h
	}
	if x := h.Rat(); x.Cmp(big.NewRat(shortest, 1)) < 0 || x.Cmp(big.NewRat(tallest, 1)) > 0 {
		r.strange("height", refusal.HeightImplausible, "25 to 250 cm", "is not the height of a patient")
	}
	return h
}

func (r *request) strange(name string, code refusal.Code, want, words string) {
	got := r.texts[name].text
	r.add(refusal.Reason{
		Code: code, Field: "--" + name, Got: got, Want: want, Source: netSource,
		Message: fmt.Sprintf("%s %s; want %s", got, words, want), Remedy: "check the figure and its unit",
	})
}

// checkIndex refuses a weight and a height that cannot belong together.
func checkIndex(r *request, s body.Size) {
	bmi, err := s.BMI()
	if err != nil || bmi.Cmp(big.NewRat(thinnest, 1)) >= 0 && bmi.Cmp(big.NewRat(widestBody, 1)) <= 0 {
		return
	}
	r.add(refusal.Reason{
		Code: refusal.BodyValuesStrange, Field: "--weight, --height", Source: netSource,
		Got: "a body mass index of " + r.style.Number(bmi), Want: "5 to 90",
		Message: fmt.Sprintf("a weight of %s and a height of %s do not fit each other", r.texts["weight"].text, r.texts["height"].text),
		Remedy:  "check both figures and their units, and that they are not swapped",
	})
}
