package dilution

import (
	"drawup/dilution/formulary"
	"drawup/dilution/order"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// nameIt settles the names that the papers print: the one of the house style,
// in the form of the site's tall-man list where the list has the name, and
// beside it the name of the other side of the ocean where the site wants both.
func (w *work) nameIt() bool {
	d, style := w.plan.Drug, w.plan.Style
	w.plan.Name = d.LabelName(style)
	if w.site.dualNames {
		w.plan.Other = otherName(d, style)
	}
	if written := w.site.tallMan.Of(w.plan.Name); written != "" {
		w.plan.Name = written
	}
	return true
}

// otherName is the label name of another house style, "" when all are alike.
func otherName(d formulary.Drug, style quantity.Style) string {
	for _, s := range []quantity.Style{quantity.UK(), quantity.US(), quantity.SI()} {
		if n := d.LabelName(s); n != d.LabelName(style) {
			return n
		}
	}
	return ""
}

// tallManOf finds the list of names that the site has picked. None is picked
// when the order is silent; a list that the formulary lacks is refused.
func tallManOf(f *formulary.Formulary, picked order.Field[string]) (formulary.TallMan, refusal.List) {
	if !picked.Given() {
		return formulary.TallMan{}, nil
	}
	var have []string
	for _, t := range f.TallMan {
		if t.Jurisdiction == picked.Value {
			return t, nil
		}
		have = append(have, t.Jurisdiction)
	}
	return formulary.TallMan{}, refusal.List{{
		Code: refusal.ValueUnknown, Severity: refusal.Refuse,
		Field: "site.tall_man", Got: picked.Text, Want: joinOr(quoted(have)), Rule: "R10", Pos: picked.Pos,
		Message: "the formulary has no tall-man list of " + picked.Text,
		Remedy:  "take one that it has, leave the key out, or add the list to the site's own formulary file",
	}}
}
