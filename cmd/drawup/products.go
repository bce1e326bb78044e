package main

import (
	"fmt"

	"drawup/dilution/formulary"
	"drawup/dilution/order"
	"drawup/dilution/refusal"
	"drawup/labels"
)

// productsOf is the order's [[site.gtin]] with the formulary's names of their
// drugs. A drug that the formulary does not have, and a preparation with two
// numbers under two names of its drug, are refused: a label must not get a
// number by chance.
func productsOf(o order.Order, f *formulary.Formulary) ([]labels.Product, refusal.List) {
	var out []labels.Product
	var faults refusal.List
	for _, p := range o.Site.Products {
		if p.Drug.Value == "" {
			continue // refused when it was read
		}
		d, near, ok := f.Find(p.Drug.Value)
		if !ok {
			faults = append(faults, refusal.Reason{
				Code: refusal.DrugUnknown, Severity: refusal.Refuse, Pos: p.Drug.Pos, Field: "site.gtin.drug",
				Got: p.Drug.Value, Want: "a drug of the formulary", Rule: "R10",
				Message: fmt.Sprintf("the GTIN %s stands for %q, which the formulary does not have", p.Number.Value, p.Drug.Value),
				Remedy:  nearestOr(p.Drug.Value, near, "", "type drawup formulary list for the drugs, or take the entry out"),
			})
			continue
		}
		for _, other := range out {
			if other.Name == d.Name && other.Concentration.Value.Equal(p.Concentration.Value) &&
				p.Volume.Value.Given() && other.Volume.Value.Given() && other.Volume.Value.Cmp(p.Volume.Value) == 0 {
				faults = append(faults, refusal.Reason{
					Code: refusal.KeyConflict, Severity: refusal.Refuse, Pos: p.Number.Pos, Field: "site.gtin.number",
					Got: p.Number.Text, Want: "one number for a preparation",
					Message: fmt.Sprintf("%s at this concentration and volume has the GTIN %s already", d.Name, other.Number.Value),
					Remedy:  "take one of the two out",
				})
			}
		}
		out = append(out, labels.Product{Product: p, Name: d.Name})
	}
	return out, faults
}
