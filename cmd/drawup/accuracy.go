package main

import (
	"errors"
	"fmt"
	"io"
	"math/big"
	"strings"

	"drawup/dilution"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/dilution/syringe"
)

func accuracyFlags() []flagSpec {
	return []flagSpec{
		{"barrel", "10 mL", "a syringe: how far a volume read on it may be off; with --reading"},
		{"reading", "4 mL", "the volume that is read on --barrel"},
		{"parts", "5 %, 5 %, 4 %", `what makes a value unsure, each plus or minus; "triangular" or "standard" behind one says its shape`},
		{"of", "50 mL", "with --parts in mL: the volume that they are parts of"},
		{"labelled", "0.5 mL", "an ampoule or vial: its labelled volume, for the overfill; with --fluid"},
		{"fluid", "mobile", "mobile or viscous, for the overfill"},
	}
}

// An accuracyDocument is the answer of drawup accuracy: a tolerance, an
// uncertainty or an overfill. Relative is in per cent.
type accuracyDocument struct {
	Tolerance *quantityJSON `json:"tolerance,omitempty"` // either way
	Relative  *quantityJSON `json:"relative,omitempty"`
	Standard  *quantityJSON `json:"standard_uncertainty,omitempty"`
	Expanded  *quantityJSON `json:"expanded_uncertainty,omitempty"` // coverage factor 2
	Worst     *quantityJSON `json:"worst_case,omitempty"`           // everything off to one side
	Excess    *quantityJSON `json:"excess,omitempty"`
	Working   []string      `json:"working,omitempty"`
	findings
	percents []string // the same figures in per cent, beside those in mL
}

func runAccuracy(e env, args []string) int {
	r := newRequest("accuracy", accuracyFlags(), args)
	if r.help {
		return showHelp(e, "accuracy")
	}
	doc := &accuracyDocument{}
	r.exactlyOne("barrel", "parts", "labelled")
	if !r.given("barrel") {
		r.forbid("it goes with --barrel", "reading")
	}
	if !r.given("parts") {
		r.forbid("it goes with --parts", "of")
	}
	if !r.given("labelled") {
		r.forbid("it goes with --labelled", "fluid")
	}
	if !r.refused() {
		switch {
		case r.given("barrel"):
			doc.barrel(r)
		case r.given("parts"):
			doc.combine(r)
		case r.given("labelled"):
			doc.overfill(r)
		}
	}
	if r.refused() {
		doc = &accuracyDocument{}
	}
	return r.finish(e, doc, func(w io.Writer) { tellAccuracy(w, doc) })
}

// barrel is the tolerance of one reading.
func (d *accuracyDocument) barrel(r *request) {
	r.need("reading", "the tolerance depends on what is read")
	nominal, v := read(r, "barrel", quantity.ParseVolume), read(r, "reading", quantity.ParseVolume)
	if r.refused() {
		return
	}
	b, ok := syringe.Find(nominal)
	if !ok {
		r.add(refusal.Reason{
			Code: refusal.SyringeUnknown, Field: "--barrel", Rule: "R8", Got: r.style.Volume(nominal), Want: knownBarrels(r.style),
			Message: "no graduations of a " + r.style.Volume(nominal) + " syringe are on record", Remedy: "use one of: " + knownBarrels(r.style),
		})
		return
	}
	moved, _, err := v.ToStep(b.Step(), quantity.HalfUp)
	if err != nil || moved.IsZero() {
		r.add(refusal.Reason{
			Code: refusal.VolumeOffGraduation, Field: "--reading", Rule: "R8", Got: r.style.Volume(v), Want: "at least " + r.style.Volume(b.Step()),
			Message: fmt.Sprintf("%s is less than half of the first line of a %s syringe, %s", r.style.Volume(v), r.style.Volume(nominal), r.style.Volume(b.Step())),
			Remedy:  "ask for a smaller syringe or a larger volume",
		})
		return
	}
	t := b.Tolerance(v)
	if !t.Given() {
		r.add(refusal.Reason{
			Code: refusal.VolumeAboveSyringe, Field: "--reading", Rule: "R8", Got: r.style.Volume(v), Want: "at most " + r.style.Volume(nominal),
			Message: fmt.Sprintf("%s is more than a %s syringe holds", r.style.Volume(v), r.style.Volume(nominal)),
			Remedy:  "check both volumes, and that they are not swapped",
		})
		return
	}
	d.Tolerance = volumeJSON(r.style, t)
	share := new(big.Rat).Quo(t.Rat(), v.Rat())
	d.Relative = percentJSON(r.style, quantity.PerCent(share.Mul(share, big.NewRat(100, 1))))
	d.Working = append(d.Working, "after "+syringe.ToleranceSource)
	if moved.Cmp(v) != 0 {
		r.caution(refusal.Reason{
			Code: refusal.VolumeOffGraduation, Field: "--reading", Rule: "R2", Source: b.Source(), Got: r.style.Volume(v),
			Want:    "a multiple of " + r.style.Volume(b.Step()),
			Message: fmt.Sprintf("%s has no line on the %s syringe; the nearest is %s", r.style.Volume(v), r.style.Volume(nominal), r.style.Volume(moved)),
			Remedy:  "ask for the tolerance at a line",
		})
	}
}

func knownBarrels(s quantity.Style) string {
	var out []string
	for _, b := range syringe.Known() {
		out = append(out, s.Volume(b.Nominal()))
	}
	return strings.Join(out, ", ")
}

// combine is the uncertainty of independent parts.
func (d *accuracyDocument) combine(r *request) {
	of := read(r, "of", quantity.ParseVolume)
	var widths []syringe.Width
	for _, text := range listed(r.texts["parts"].text) {
		w, err := readWidth(text, of)
		if err != nil {
			r.add(sumFault("--parts", err))
			continue
		}
		widths = append(widths, w)
	}
	if r.refused() {
		return
	}
	u, err := syringe.Combine(widths...)
	if err != nil {
		r.add(faultOf("--parts", err))
		return
	}
	show := func(p quantity.Percent) *quantityJSON {
		if !p.Given() {
			return nil
		}
		if !of.Given() {
			return percentJSON(r.style, p)
		}
		d.percents = append(d.percents, r.style.Percent(p))
		share := new(big.Rat).Quo(p.Rat(), big.NewRat(100, 1))
		return volumeJSON(r.style, quantity.Millilitres(share.Mul(share, of.Rat())))
	}
	d.Standard, d.Expanded, d.Worst = show(u.Standard), show(u.Expanded), show(u.Worst)
	d.Working = append(d.Working, "standard uncertainty: root of the sum of squares (GUM, ISO/IEC Guide 98-3); a rectangular width counts by the root of 3, a triangular one by the root of 6",
		"the parts must be independent: two readings of one syringe are not; add them first, as one part")
}

// readWidth is one part: "5 %", "0.06 mL", "0.05 mL standard".
func readWidth(text string, of quantity.Volume) (syringe.Width, error) {
	w := syringe.Width{Shape: syringe.Rectangular}
	for _, shape := range []syringe.Shape{syringe.Triangular, syringe.Standard, syringe.Rectangular} {
		if head, ok := strings.CutSuffix(strings.TrimSpace(text), " "+shape.String()); ok {
			text, w.Shape = head, shape
			break
		}
	}
	if v, err := quantity.ParseVolume(text); err == nil {
		if !of.Given() {
			return w, refusal.Reason{Code: refusal.FlagMissing, Severity: refusal.Refuse, Field: "--of",
				Message: "a part in mL needs the volume that it is a part of", Remedy: `add --of "50 mL"`}
		}
		share := new(big.Rat).Quo(v.Rat(), of.Rat())
		w.Percent = quantity.PerCent(share.Mul(share, big.NewRat(100, 1)))
		return w, nil
	}
	var err error
	if w.Percent, err = quantity.ParsePercent(text); err == nil && w.Percent.Rat().Cmp(big.NewRat(100, 1)) > 0 {
		err = refusal.Reason{Code: refusal.ValueUnknown, Severity: refusal.Refuse, Field: "--parts", Got: text, Want: "at most 100 %", Source: netSource,
			Message: "--parts: " + text + " either way is wider than the value itself", Remedy: "check the figure"}
	}
	return w, err
}

// overfill is the excess that the pharmacopoeia recommends.
func (d *accuracyDocument) overfill(r *request) {
	r.need("fluid", "the excess depends on how the fluid flows")
	v := read(r, "labelled", quantity.ParseVolume)
	fluid, ok := dilution.FluidityNamed(r.texts["fluid"].text)
	if r.given("fluid") && !ok {
		r.add(refusal.Reason{
			Code: refusal.ValueUnknown, Field: "--fluid", Got: r.texts["fluid"].text, Want: "mobile or viscous",
			Message: fmt.Sprintf("--fluid: got %q, want mobile or viscous", r.texts["fluid"].text), Remedy: "write one of the two",
		})
	}
	if r.refused() {
		return
	}
	excess, err := dilution.Overfill(v, fluid)
	var unlisted *dilution.OverfillUnlisted
	if errors.As(err, &unlisted) {
		r.add(refusal.Reason{
			Code: refusal.ValueUnknown, Field: "--labelled", Got: r.style.Volume(v), Want: "a size of the table", Source: dilution.OverfillSource,
			Message: "--labelled: " + err.Error() + "; nothing is put between two rows", Remedy: "ask for the nearest sizes of the table",
		})
		return
	}
	if err != nil {
		r.add(faultOf("--labelled", err))
		return
	}
	share := new(big.Rat).Quo(excess.Rat(), v.Rat())
	d.Excess, d.Relative = volumeJSON(r.style, excess), percentJSON(r.style, quantity.PerCent(share.Mul(share, big.NewRat(100, 1))))
	d.Working = append(d.Working, "after "+dilution.OverfillSource)
	r.caution(refusal.Reason{
		Code: refusal.BagFillUnknown, Field: "--labelled", Rule: "R9", Source: dilution.OverfillSource,
		Message: "this is what is recommended to makers, not what the container in the hand holds",
		Remedy:  "dose by a measured volume, never by the whole container",
	})
}

func tellAccuracy(w io.Writer, d *accuracyDocument) {
	beside := func(n int) string {
		if n < len(d.percents) {
			return " (" + d.percents[n] + ")"
		}
		return ""
	}
	switch {
	case d.Tolerance != nil:
		fmt.Fprintf(w, "plus or minus %s, %s of the reading\n", shown(d.Tolerance), shown(d.Relative))
	case d.Excess != nil:
		fmt.Fprintf(w, "%s more than labelled, %s\n", shown(d.Excess), shown(d.Relative))
	case d.Standard != nil:
		fmt.Fprintf(w, "plus or minus %s%s, with a coverage factor of 2\n", shown(d.Expanded), beside(1))
		line(w, "standard uncertainty", shown(d.Standard)+beside(0))
		if d.Worst != nil {
			line(w, "at the worst", shown(d.Worst)+beside(2))
		}
	}
	for _, s := range d.Working {
		line(w, "how", s)
	}
}
