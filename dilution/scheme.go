package dilution

import (
	"strings"

	"drawup/dilution/order"
	"drawup/dilution/refusal"
)

// edition is the caution that goes with labels of the older edition or with a
// regional colour: the danger is not the one scheme or the other but the two
// side by side (DIVI 2012, on the change-over). It has no figure in it that a
// second route could not confirm.
func edition(s site, o order.Order) refusal.List {
	var out refusal.List
	add := func(field order.Field[string], got, message string) {
		out = append(out, refusal.Reason{
			Code: refusal.LabelEdition, Severity: refusal.Caution,
			Field: "site", Got: got, Want: "one scheme on all labels of the site", Rule: "R16",
			Source: "DIVI, labelling of syringes, 2012", Pos: field.Pos, Message: message,
			Remedy: "take away labels of any other scheme before the first of these is used",
		})
	}
	if s.edition == order.Edition2008 {
		add(o.Site.Edition, s.edition, "the labels follow the older edition of the standard, which the site has picked")
	}
	if s.region != "" {
		add(o.Site.Anticoagulants, s.region, "anticoagulants have the regional colour that the site has picked")
	}
	return out
}

// ofOrder are the cautions of the order's own text that belong to no syringe and
// no patient.
func ofOrder(faults refusal.List) refusal.List {
	var out refusal.List
	for _, r := range faults.Cautions().Of(0) {
		if !strings.HasPrefix(r.Field, "patient.") {
			out = append(out, r)
		}
	}
	return out
}
