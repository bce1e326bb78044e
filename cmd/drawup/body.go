package main

import (
	"errors"
	"fmt"
	"io"
	"math/big"
	"strings"

	"drawup/dilution/body"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

func bodyFlags() []flagSpec {
	return []flagSpec{
		{"weight", "72 kg", `actual body weight; "165 pounds" or "11 stone 4 pounds" is read too`},
		{"height", "178 cm", `height; "5 feet 7 inches" is read too`},
		{"sex", "female", "female or male, as the equations ask; without it only BMI and surface are worked"},
		{"age", "54 years", "age; from 1 to 17 years the ideal weight is a child's and no other weight is worked"},
		{"ideal", "60 kg", "an ideal weight worked elsewhere, with --weight alone: the adjusted weight"},
		{"estimate", "APLS 2011", "with --age alone: guess a child's weight by this published rule; all lists the rules"},
	}
}

// A bodyDocument is the answer of drawup body. A figure that an equation does
// not give is left out, and a caution says why.
type bodyDocument struct {
	Ideal     *quantityJSON `json:"ideal_devine,omitempty"`
	Adjusted  *quantityJSON `json:"adjusted,omitempty"`
	Lean      *quantityJSON `json:"lean_janmahasatian,omitempty"`
	James     *quantityJSON `json:"lean_james,omitempty"`
	Boer      *quantityJSON `json:"lean_boer,omitempty"`
	Child     *quantityJSON `json:"ideal_child,omitempty"`
	Mosteller *quantityJSON `json:"surface_mosteller,omitempty"`
	DuBois    *quantityJSON `json:"surface_dubois,omitempty"`
	Haycock   *quantityJSON `json:"surface_haycock,omitempty"`
	Gehan     *quantityJSON `json:"surface_gehan_george,omitempty"`
	Boyd      *quantityJSON `json:"surface_boyd,omitempty"`
	BMI       *quantityJSON `json:"bmi,omitempty"`
	patientJSON
	findings
}

func runBody(e env, args []string) int {
	r := newRequest("body", bodyFlags(), args)
	if r.help {
		return showHelp(e, "body")
	}
	switch {
	case r.given("estimate"):
		return runEstimate(e, r)
	case r.given("ideal"):
		return runAdjusted(e, r)
	}
	doc := &bodyDocument{}
	size := readSize(r)
	if !r.refused() {
		doc.patientJSON = patient{weight: size.Weight, height: size.Height}.echo(r.style)
		workBody(r, size, doc)
	}
	return r.finish(e, doc, func(w io.Writer) { tellBody(w, doc) })
}

func readSize(r *request) body.Size {
	r.need("weight", "every figure goes by it")
	r.need("height", "every figure goes by it")
	size := body.Size{
		Weight: readWeight(r),
		Height: readHeight(r),
		Age:    read(r, "age", body.ParseAge),
	}
	if r.given("sex") {
		sex, ok := body.SexNamed(r.texts["sex"].text)
		if !ok {
			r.add(refusal.Reason{
				Code: refusal.ValueUnknown, Field: "--sex", Got: r.texts["sex"].text, Want: "female or male",
				Message: fmt.Sprintf("--sex: got %q, want female or male", r.texts["sex"].text),
				Remedy:  "choose the one that the equations should use",
			})
		}
		size.Sex = sex
	}
	if size.Weight.Given() && size.Height.Given() {
		checkIndex(r, size)
	}
	return size
}

func workBody(r *request, size body.Size, doc *bodyDocument) {
	child := size.Age.Given() && size.Age.Years() < 18
	if child {
		doc.Child = r.weightOf(size.ChildIdeal)
	} else {
		doc.Ideal = r.weightOf(size.Ideal)
	}
	doc.Adjusted, doc.Lean = r.weightOf(size.Adjusted), r.weightOf(size.Lean)
	doc.James, doc.Boer = r.weightOf(size.James), r.weightOf(size.Boer)
	for _, x := range []struct {
		area body.Area
		to   **quantityJSON
	}{
		{body.Mosteller, &doc.Mosteller}, {body.DuBois, &doc.DuBois}, {body.Haycock, &doc.Haycock},
		{body.GehanGeorge, &doc.Gehan}, {body.Boyd, &doc.Boyd},
	} {
		*x.to = r.surfaceOf(size, x.area)
	}
	doc.BMI = bmiJSON(r, size)
	for _, n := range size.Notes() {
		r.caution(refusal.Reason{Code: refusal.Code(n.Code), Field: "body size", Message: n.Text, Source: n.Source})
	}
	if doc.Child != nil {
		r.caution(refusal.Reason{
			Code: refusal.BodySizeOutside, Field: "body size", Rule: "R3", Source: body.ChildIdealSource,
			Message: "the ideal weight of a child is a rule of thumb by height; orders do not use it",
		})
	}
}

// weightOf is a weight by an equation, or nothing and a caution why.
func (r *request) weightOf(work func() (quantity.BodyWeight, error)) *quantityJSON {
	w, err := work()
	if err != nil {
		r.leftOut(err)
		return nil
	}
	shown, err := w.ToStep(big.NewRat(1, 10), quantity.HalfUp)
	if err != nil {
		r.leftOut(err)
		return nil
	}
	return &quantityJSON{w.Exact(), r.style.BodyWeight(shown), "kg"}
}

// surfaceOf is a surface area by an equation, or nothing and a caution why.
func (r *request) surfaceOf(size body.Size, area body.Area) *quantityJSON {
	a, err := size.Surface(area)
	if err != nil {
		r.leftOut(err)
		return nil
	}
	shown, err := size.UsedSurfaceBy(area)
	if err != nil {
		r.leftOut(err)
		return nil
	}
	return &quantityJSON{a.Exact(), r.style.Surface(shown), "m2"}
}

func bmiJSON(r *request, size body.Size) *quantityJSON {
	bmi, err := size.BMI()
	if err != nil {
		r.leftOut(err)
		return nil
	}
	shown, err := quantity.PerCent(bmi).ToStep(big.NewRat(1, 10), quantity.HalfUp)
	if err != nil {
		r.leftOut(err)
		return nil
	}
	return &quantityJSON{exactText(bmi), r.style.Number(shown.Rat()) + " kg/m²", "kg/m2"}
}

// leftOut says, once for each reason, which figures of the body are not there.
func (r *request) leftOut(err error) {
	x := refusal.Reason{Code: refusal.BodySizeOutside, Field: "body size", Message: err.Error()}
	figure := ""
	var outside *body.OutsideEquation
	var missing *body.MissingError
	switch {
	case errors.As(err, &outside):
		x.Source, x.Message, figure = outside.Source, outside.Reason, outside.Equation
		x.Remedy = "use the actual weight, or a local rule for this patient"
	case errors.As(err, &missing):
		x.Code, x.Field, figure = missingCode(missing.What), "--"+string(missing.What), missing.Equation
		x.Message = string(missing.What) + " is not given"
		x.Remedy = r.remedyFor(string(missing.What))
	}
	const leads = "; left out: "
	for i, have := range r.faults {
		if have.Code == x.Code && strings.HasPrefix(have.Message, x.Message+leads) {
			r.faults[i].Message += ", " + figure
			return
		}
	}
	x.Message += leads + figure
	r.caution(x)
}

func missingCode(v body.Value) refusal.Code {
	switch v {
	case body.NeedSex:
		return refusal.SexMissing
	case body.NeedAge:
		return refusal.AgeMissing
	case body.NeedHeight:
		return refusal.HeightMissing
	case body.NeedWeight:
		return refusal.WeightMissing
	}
	return refusal.QuantityMissing
}

func tellBody(w io.Writer, d *bodyDocument) {
	for _, row := range []struct {
		name, how string
		q         *quantityJSON
	}{
		{"ideal weight", "Devine 1974", d.Ideal},
		{"ideal weight", "of a child, by height (clinPK)", d.Child},
		{"adjusted weight", "ideal and 0.4 of the excess over it; the actual weight where that is below the ideal", d.Adjusted},
		{"lean weight", "Janmahasatian 2005", d.Lean},
		{"lean weight", "James 1976", d.James},
		{"lean weight", "Boer 1984", d.Boer},
		{"surface area", body.Mosteller.String(), d.Mosteller},
		{"surface area", body.DuBois.String(), d.DuBois},
		{"surface area", body.Haycock.String(), d.Haycock},
		{"surface area", body.GehanGeorge.String(), d.Gehan},
		{"surface area", body.Boyd.String(), d.Boyd},
		{"body mass index", "weight ÷ height squared", d.BMI},
	} {
		if row.q != nil {
			fmt.Fprintf(w, "%-16s %s%s\n", row.name, pad(row.q.Printed, 12), row.how)
		}
	}
	d.patientJSON.tell(w)
	fmt.Fprintln(w, "\nweights are rounded half up to 0.1 kg, surface areas to 0.01 m²; roots are worked to 40 digits (rule R1)")
}
