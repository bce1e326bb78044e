package main

import (
	"bytes"
	"encoding/json"
	"fmt"
	"math/big"

	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// A quantityJSON is one quantity of a JSON document. Exact is the exact value
// counted in Unit: decimal text if it terminates, else a fraction such as
// "28/3". Printed is what paper would show in the chosen style. Unit is a plain
// word that the command also reads: "microgram/kg/min".
type quantityJSON struct {
	Exact   string `json:"exact"`
	Printed string `json:"printed"`
	Unit    string `json:"unit"`
}

// A reasonJSON is one refusal or caution of a JSON document.
type reasonJSON struct {
	Code    string       `json:"code"`
	Message string       `json:"message"`
	Field   string       `json:"field"`
	Got     string       `json:"got"`
	Want    string       `json:"want"`
	Rule    string       `json:"rule"`
	Source  string       `json:"source"`
	Remedy  string       `json:"remedy"`
	Instead *insteadJSON `json:"instead,omitempty"`
	Syringe int          `json:"syringe,omitempty"`
	File    string       `json:"file,omitempty"`
	Line    int          `json:"line,omitempty"`
	Column  int          `json:"column,omitempty"`
}

// findings is the part that every JSON document ends with. Both lists are
// always there, empty or not.
type findings struct {
	Refusals []reasonJSON `json:"refusals"`
	Cautions []reasonJSON `json:"cautions"`
}

// take puts the reasons of l into the document.
func (f *findings) take(l refusal.List) {
	f.Refusals = reasonsJSON(l.Refusals())
	f.Cautions = reasonsJSON(l.Cautions())
}

// A document is a JSON answer that can take reasons.
type document interface{ take(refusal.List) }

// A bareDocument holds reasons and nothing else.
type bareDocument struct{ findings }

func reasonsJSON(l refusal.List) []reasonJSON {
	out := make([]reasonJSON, 0, len(l))
	for _, r := range l {
		out = append(out, reasonJSON{
			Code: string(r.Code), Message: r.Message, Field: r.Field, Got: r.Got, Want: r.Want,
			Rule: r.Rule, Source: r.Source, Remedy: r.Remedy, Instead: insteadOf(r.Instead), Syringe: r.Syringe,
			File: r.Pos.File, Line: r.Pos.Line, Column: r.Pos.Column,
		})
	}
	return out
}

// encode is the document as text: two blanks of indent, keys in the order of
// the struct, no escapes for < > &.
func encode(doc any) ([]byte, error) {
	var b bytes.Buffer
	enc := json.NewEncoder(&b)
	enc.SetEscapeHTML(false)
	enc.SetIndent("", "  ")
	if err := enc.Encode(doc); err != nil {
		return nil, fmt.Errorf("document: %w", err)
	}
	return b.Bytes(), nil
}

func amountJSON(s quantity.Style, a quantity.Amount) *quantityJSON {
	return amountInJSON(s, a, a.Best())
}

func amountInJSON(s quantity.Style, a quantity.Amount, u quantity.Unit) *quantityJSON {
	return &quantityJSON{a.Exact(u), s.AmountIn(a, u), u.String()}
}

func volumeJSON(s quantity.Style, v quantity.Volume) *quantityJSON {
	return &quantityJSON{v.Exact(), s.Volume(v), "mL"}
}

func concentrationJSON(s quantity.Style, c quantity.Concentration) *quantityJSON {
	u := c.Best()
	return &quantityJSON{c.Exact(u), s.ConcentrationIn(c, u), u.String() + "/mL"}
}

func flowRateJSON(s quantity.Style, f quantity.FlowRate) *quantityJSON {
	return &quantityJSON{f.Exact(), s.FlowRate(f), "mL/h"}
}

func doseRateJSON(s quantity.Style, d quantity.DoseRate) *quantityJSON {
	return &quantityJSON{d.Exact(), s.DoseRate(d), doseRateUnit(d)}
}

// doseRateUnit is the unit of d as plain text that the command reads too.
func doseRateUnit(d quantity.DoseRate) string {
	return d.Unit().String() + plainBasis(d.Basis()) + "/" + d.Period().String()
}

func plainBasis(b quantity.Basis) string {
	switch b {
	case quantity.PerKilogram:
		return "/kg"
	case quantity.PerSquareMetre:
		return "/m2"
	}
	return ""
}

func bodyWeightJSON(s quantity.Style, w quantity.BodyWeight) *quantityJSON {
	return &quantityJSON{w.Exact(), s.BodyWeight(w), "kg"}
}

func surfaceJSON(s quantity.Style, a quantity.BodySurfaceArea) *quantityJSON {
	return &quantityJSON{a.Exact(), s.Surface(a), "m2"}
}

func lengthJSON(s quantity.Style, l quantity.Length) *quantityJSON {
	return &quantityJSON{l.Exact(), s.Length(l), "cm"}
}

func durationJSON(s quantity.Style, d quantity.Duration) *quantityJSON {
	return &quantityJSON{d.Exact(), s.Duration(d), "min"}
}

// shownSpan is d as a line of working shows it: "about" says that printing cut
// it down to whole minutes, or under an hour to whole seconds.
func shownSpan(s quantity.Style, d quantity.Duration) string {
	x := d.Rat()
	if x.Cmp(big.NewRat(60, 1)) < 0 {
		x.Mul(x, big.NewRat(60, 1))
	}
	if x.IsInt() {
		return s.Duration(d)
	}
	return "about " + s.Duration(d)
}

func percentJSON(s quantity.Style, p quantity.Percent) *quantityJSON {
	return &quantityJSON{p.Exact(), s.Percent(p), "%"}
}

// exactText is r in full: a decimal if it ends, else a fraction.
func exactText(r *big.Rat) string { return quantity.PerCent(r).Exact() }
