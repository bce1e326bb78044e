package main

import (
	"fmt"
	"io"
	"strings"

	"drawup/dilution/body"
	"drawup/dilution/pump"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// A patient is whom a quick sum is for, as far as the flags say.
type patient struct {
	weight  quantity.BodyWeight
	height  quantity.Length
	surface quantity.BodySurfaceArea
	area    body.Area // how the surface was worked; 0 when it was typed
}

// A patientJSON echoes in kg, cm and m² what a sum went by. Surface is what was
// used, to 0.01 m² when it was worked.
type patientJSON struct {
	Weight    *quantityJSON `json:"weight,omitempty"`
	Height    *quantityJSON `json:"height,omitempty"`
	Surface   *quantityJSON `json:"surface,omitempty"`
	SurfaceBy string        `json:"surface_by,omitempty"`
	typed     []string      // what was typed in other units, with its reading
}

func patientFlags() []flagSpec {
	return []flagSpec{
		{"weight", "72 kg", `body weight, where the dose is per kg; "165 pounds" or "11 stone 4 pounds" is read too`},
		{"surface", "1.8 m2", "surface area, where the dose is per m²"},
		{"surface-by", "Mosteller", "the equation, where the surface is worked from --weight and --height"},
		{"height", "178 cm", `height, for --surface-by; "5 feet 7 inches" is read too`},
	}
}

// areaNames lists the equations of surface area for remedies.
func areaNames() string {
	var out []string
	for _, a := range body.Areas() {
		out = append(out, a.String())
	}
	return strings.Join(out, ", ")
}

// readArea is --surface-by.
func readArea(r *request, name string) body.Area {
	if !r.given(name) {
		return 0
	}
	text := r.texts[name].text
	area, ok := body.AreaNamed(text)
	if !ok {
		r.add(refusal.Reason{
			Code: refusal.ValueUnknown, Field: "--" + name, Got: text, Want: areaNames(),
			Message: fmt.Sprintf("--%s: got %q, want the name of an equation", name, text),
			Remedy:  "choose one of: " + areaNames(),
		})
	}
	return area
}

// readPatient is what a dose is counted per. A weight that is missing is refused,
// and so is one that has no part in the sum: a "/kg" may have been forgotten.
func readPatient(r *request, b quantity.Basis) patient {
	p := patient{weight: readWeight(r), height: readHeight(r), surface: read(r, "surface", quantity.ParseSurface)}
	p.area = readArea(r, "surface-by")
	switch b {
	case quantity.PerKilogram:
		r.forbid("the dose is per kg", "surface", "surface-by", "height")
		if !r.given("weight") && !r.broken {
			r.add(refusal.Reason{Code: refusal.WeightMissing, Field: "--weight", Rule: "R3",
				Message: "the dose is per kg and no body weight is given", Remedy: r.remedyFor("weight")})
		}
	case quantity.PerSquareMetre:
		p.workSurface(r)
	case quantity.Absolute:
		r.forbid("the dose is neither per kg nor per m²", "surface-by", "height")
		if !r.given("drug") { // limits per kg need a weight even then
			r.forbid("the dose is neither per kg nor per m²", "weight", "surface")
		}
	}
	return p
}

// workSurface is the surface as typed, or worked by the equation that is named.
// None is taken for granted: they differ, most for the smallest and the largest.
func (p *patient) workSurface(r *request) {
	switch {
	case r.given("surface"):
		r.forbid("the surface area itself is given", "surface-by", "height")
		if !r.given("drug") {
			r.forbid("the dose is per m²", "weight")
		}
		return
	case r.count("weight", "height", "surface-by") == 0 && !r.broken:
		r.add(refusal.Reason{Code: refusal.SurfaceMissing, Field: "--surface", Rule: "R3",
			Message: "the dose is per m² and no surface area is given",
			Remedy:  r.remedyFor("surface") + `, or --weight, --height and --surface-by to have it worked`})
		return
	}
	r.need("weight", "the surface area is worked from weight and height")
	r.need("height", "the surface area is worked from weight and height")
	r.need("surface-by", "the equations differ, and none is taken for granted")
	if r.refused() {
		return
	}
	size := body.Size{Weight: p.weight, Height: p.height}
	checkIndex(r, size)
	var err error
	if p.surface, err = size.UsedSurfaceBy(p.area); err != nil {
		r.add(faultOf("--surface-by", err))
	}
}

// per is the patient for package pump.
func (p patient) per(b quantity.Basis) pump.Per {
	switch b {
	case quantity.PerKilogram:
		return pump.PerWeight(p.weight)
	case quantity.PerSquareMetre:
		return pump.PerSurface(p.surface)
	case quantity.Absolute:
		return pump.PerNothing()
	}
	return pump.Per{}
}

// scalar is what a dose is multiplied by, in words; "" for an absolute one.
func (p patient) scalar(s quantity.Style, b quantity.Basis) string {
	switch b {
	case quantity.PerKilogram:
		return "body weight " + shown(bodyWeightJSON(s, p.weight))
	case quantity.PerSquareMetre:
		return "surface area " + shown(surfaceJSON(s, p.surface))
	case quantity.Absolute:
	}
	return ""
}

// amount is a dose for this patient.
func (p patient) amount(d quantity.Dose) (quantity.Amount, error) {
	switch d.Basis() {
	case quantity.PerKilogram:
		return d.For(p.weight)
	case quantity.PerSquareMetre:
		return d.On(p.surface)
	case quantity.Absolute:
	}
	return d.Amount()
}

// echo is the patient for the answer.
func (p patient) echo(s quantity.Style) patientJSON {
	var out patientJSON
	if p.weight.Given() {
		out.Weight = bodyWeightJSON(s, p.weight)
		out.say("weight", p.weight.Written(), "kg", out.Weight)
	}
	if p.height.Given() {
		out.Height = lengthJSON(s, p.height)
		out.say("height", p.height.Written(), "cm", out.Height)
	}
	if p.surface.Given() {
		out.Surface, out.SurfaceBy = surfaceJSON(s, p.surface), p.area.String()
	}
	return out
}

// say keeps a line for a value that was typed in another unit than it is shown.
func (p *patientJSON) say(name, typed, unit string, q *quantityJSON) {
	if !strings.HasSuffix(typed, unit) {
		p.typed = append(p.typed, fmt.Sprintf("%s%s (typed as %s)", pad(name, 22), shown(q), typed))
	}
}

// tell writes what was typed in other units, and a surface that was worked.
func (p *patientJSON) tell(w io.Writer) {
	for _, s := range p.typed {
		fmt.Fprintf(w, "  %s\n", s)
	}
	if p.SurfaceBy != "" {
		line(w, "surface area", fmt.Sprintf("%s, half up to 0.01 m² (%s)", p.Surface.Printed, p.SurfaceBy))
	}
}
