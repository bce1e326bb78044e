package labels

import (
	"fmt"

	"drawup/dilution"
	"drawup/dilution/order"
	"drawup/dilution/recheck"
	"drawup/labels/gs1"
)

// This file is the one place that says what the barcode of a label holds. It
// says nothing that the label, or for the formulary the sheets, do not say in
// print.
//
// The company-internal identifiers may stand alone (GS1 syntax dictionary, lines
// 91 to 99):
//
//	91  drug, by its ATC code               N01AX07
//	92  use-by, YYMMDDhhmm, then serial     2612020730 00001003
//	93  concentration per mL                2mg/mL
//	94  amount in the syringe               20mg
//	95  formulary: first digits of its      7a83c0d1
//	    digest, as the sheets print it
//	96  concentration of the second drug    500ug/mL
//	    of a mixture
//
// Times are those of the clock where the label is made. Units are g mg ug ng
// unit mmol umol: the micro sign is none of the signs that a code may hold.
//
// Where the site has given the preparation a trade item number (GTIN) of its
// own, the code names it by that: 01 number, 7003 use-by, 10 the reference that
// every paper of the run carries, 21 serial. No number is invented.
//
// The forms, the fullest first; a label gets the first that its stock has room
// for beside the words in print, without smaller type:
//
//	91 92 93 94 95 (96)                 26 by 26 modules and more
//	91 92 93                            22 by 22; all that 40 by 15 mm hold
//
//	01 7003 10 21 91 93 94 95 (96)      32 by 32 and more
//	01 7003 10 21                       24 by 24
//	01 7003 21                          20 by 20; all that 40 by 15 mm hold
//
// The last of each says drug, concentration, use-by and serial: the least that
// any label carries.

// Identifiers of the internal form.
const (
	codeDrug          = "91"
	codeUntil         = "92"
	codeConcentration = "93"
	codeAmount        = "94"
	codeFormulary     = "95"
	codeSecond        = "96"
)

// CodedDigest is how many digits of the formulary's digest the code carries.
const CodedDigest = 8

// codedMoment is how a date and time stands in 92 and 7003.
const codedMoment = "0601021504"

// A Product is a preparation with a trade item number of the site's own. Name is
// the formulary's name of its drug, whatever the order calls it.
type Product struct {
	order.Product
	Name string
}

// productOf is the site's number for what p makes: the same drug, at exactly
// the same concentration, in the same volume.
func (m Making) productOf(p dilution.Plan) (Product, bool) {
	for _, x := range m.Products {
		if x.Name == p.Drug.Name && x.Concentration.Value.Equal(p.Mixture.Concentration) && x.Volume.Value.Cmp(p.Mixture.FinalVolume) == 0 {
			return x, true
		}
	}
	return Product{}, false
}

// codesOf is every form of the code of p.
func codesOf(p dilution.Plan, m Making) ([]Cell, error) {
	if len(m.FormularyDigest) < CodedDigest {
		return nil, fmt.Errorf("got a formulary digest of %d digits, want %d or more", len(m.FormularyDigest), CodedDigest)
	}
	until, serial := p.UseBy.At.Format(codedMoment), m.SerialOf(p.Number)
	drug := gs1.Element{AI: codeDrug, Value: p.Drug.ATC}
	strength := gs1.Element{AI: codeConcentration, Value: p.Mixture.Concentration.InCode()}
	more := []gs1.Element{{AI: codeAmount, Value: p.Mixture.Amount.InCode()}, {AI: codeFormulary, Value: m.FormularyDigest[:CodedDigest]}}
	if p.Mixture.SecondConc.Given() {
		more = append(more, gs1.Element{AI: codeSecond, Value: p.Mixture.SecondConc.InCode()})
	}
	least := []gs1.Element{drug, {AI: codeUntil, Value: until + serial}, strength}
	forms := [][]gs1.Element{join(least, more), least}
	if x, ok := m.productOf(p); ok {
		number, expiry, own := gs1.Element{AI: "01", Value: x.Number.Value}, gs1.Element{AI: "7003", Value: until}, gs1.Element{AI: "21", Value: serial}
		run := []gs1.Element{number, expiry, {AI: "10", Value: m.Digest}, own}
		forms = [][]gs1.Element{join(run, []gs1.Element{drug, strength}, more), run, {number, expiry, own}}
	}
	var out []Cell
	for i, f := range forms {
		_, hri, err := gs1.Encode(f)
		if err != nil {
			return nil, err
		}
		out = append(out, Cell{Text: hri, Figure: recheck.Row(recheck.Code, i+1, "text")})
	}
	return out, nil
}

func join(lists ...[]gs1.Element) []gs1.Element {
	var out []gs1.Element
	for _, l := range lists {
		out = append(out, l...)
	}
	return out
}

// Asked is what the run itself gives to the label of p, for the second route:
// reference, formulary digest, and the site's number with what it stands for.
func (m Making) Asked(p dilution.Plan) []recheck.Figure {
	out := []recheck.Figure{
		{Paper: "run", Name: recheck.Ref, Text: m.Digest},
		{Paper: "run", Name: recheck.FormularyDigest, Text: m.FormularyDigest},
	}
	if x, ok := m.productOf(p); ok {
		out = append(out,
			recheck.Figure{Paper: "order", Name: recheck.ProductNumber, Text: x.Number.Text},
			recheck.Figure{Paper: "order", Name: recheck.ProductDrug, Text: x.Drug.Value},
			recheck.Figure{Paper: "order", Name: recheck.ProductConcentration, Text: x.Concentration.Text},
			recheck.Figure{Paper: "order", Name: recheck.ProductVolume, Text: x.Volume.Text})
	}
	return out
}
