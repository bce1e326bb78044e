package dilution

import (
	"fmt"
	"slices"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// countedAlike keeps, of each indication, the rows that are counted as the
// order is: per kg, per square metre or absolute. Where there is none, all of
// that indication stay. Otherwise a tenth of a dose per kg would pass as a small
// absolute dose.
func countedAlike[T any](
	rows []formulary.Rule[T],
	basis quantity.Basis,
	of func(T) quantity.Basis,
) []formulary.Rule[T] {
	alike := func(r formulary.Rule[T]) bool {
		for _, f := range []formulary.Figure[T]{r.UsualHigh, r.SoftHigh, r.HardHigh} {
			if f.Given() {
				return of(f.Value) == basis
			}
		}
		return false
	}
	some := map[string]bool{}
	for _, r := range rows {
		some[r.For] = some[r.For] || alike(r)
	}
	var out []formulary.Rule[T]
	for _, r := range rows {
		if alike(r) || !some[r.For] {
			out = append(out, r)
		}
	}
	return out
}

// A judged is a verdict and the indication whose row gave it.
type judged struct {
	purpose string
	verdict verdict
}

// settle picks the row that counts: the mildest of the one indication, or of
// all when they agree.
func (w *work) settle(found []judged, field string, pos refusal.Pos) (int, bool) {
	best := map[string]int{}
	var purposes []string
	for i, j := range found {
		at, seen := best[j.purpose]
		if !seen {
			purposes = append(purposes, j.purpose)
		}
		if !seen || j.verdict.rank < found[at].verdict.rank {
			best[j.purpose] = i
		}
	}
	first := best[purposes[0]]
	for _, p := range purposes[1:] {
		if found[best[p]].verdict.rank != found[first].verdict.rank {
			return 0, w.refuse(refusal.Reason{
				Code: refusal.IndicationUnclear, Field: field,
				Want: joinOr(quoted(purposes)), Rule: "R10",
				Pos: pos,
				Message: fmt.Sprintf(
					"the limits of %s depend on what it is for, and the order does not say: "+
						"this %s is right for one use and wrong for another",
					w.plan.Drug.Name, field,
				),
				Remedy: "write indication = one of: " + joinOr(quoted(purposes)),
			})
		}
	}
	return first, true
}

func quoted(list []string) []string {
	out := make([]string, len(list))
	for i, s := range list {
		out[i] = fmt.Sprintf("%q", s)
	}
	return out
}

// fittingRows are the rows for this route, age and indication.
func fittingRows[T any](w *work, rules []formulary.Rule[T], field string) ([]formulary.Rule[T], bool) {
	if len(rules) == 0 {
		return nil, w.refuse(w.noLimits(field))
	}
	var rows []formulary.Rule[T]
	var routes, bands, fors []string
	routeOK, ageMissing := false, false
	for _, r := range rules {
		routes = append(routes, r.Routes...)
		if !routeListed(r.Routes, w.plan.Route) {
			continue
		}
		routeOK = true
		fors = append(fors, r.For)
		if w.o.Indication.Given() && r.For != w.o.Indication.Value {
			continue
		}
		bands = append(bands, r.Ages())
		if r.Frail && !w.patient.Frail {
			continue
		}
		if r.Fits(w.size.Age) {
			rows = append(rows, r)
		} else if !w.size.Age.Given() {
			ageMissing = true
		}
	}
	switch {
	case len(rows) > 0:
		return frailFirst(w, rows), true
	case !routeOK:
		return nil, w.routeUnlisted(routes)
	case len(bands) == 0:
		return nil, w.refuse(w.indicationUnknown(field, fors))
	case ageMissing:
		return nil, w.refuse(w.ageMissing(field))
	}
	return nil, w.refuse(w.ageOutside(field, bands))
}

// frailFirst keeps, for a frail patient, of each indication the rows for the
// frail where there are any. Where there are none it says so.
func frailFirst[T any](w *work, rows []formulary.Rule[T]) []formulary.Rule[T] {
	if !w.patient.Frail {
		return rows
	}
	special := map[string]bool{}
	for _, r := range rows {
		special[r.For] = special[r.For] || r.Frail
	}
	var out []formulary.Rule[T]
	for _, r := range rows {
		if r.Frail == special[r.For] {
			out = append(out, r)
		}
	}
	if len(special) > 0 && !slices.ContainsFunc(out, func(r formulary.Rule[T]) bool { return r.Frail }) {
		w.caution(refusal.Reason{
			Code: refusal.FrailBlank, Field: "patient.frail", Rule: "R10", Pos: w.patient.Pos,
			Got: "frail", Want: "figures for the frail",
			Message: fmt.Sprintf("the patient is frail, and the formulary has no figures of %s for the frail", w.plan.Drug.Name),
			Remedy:  "the figures are those for others: decide with whoever prescribes",
		})
	}
	return out
}

// noLimits says that the formulary stores no limits for this use (R10).
func (w *work) noLimits(field string) refusal.Reason {
	return refusal.Reason{
		Code: refusal.FormularyBlank, Field: field,
		Want: "limits for " + w.use(), Rule: "R10",
		Pos:     w.o.Pos,
		Message: fmt.Sprintf("the formulary has no %s limits of %s for %s", field, w.plan.Drug.Name, w.use()),
		Remedy:  "add them with their source to the formulary (whoever keeps it does that)",
	}
}

// indicationUnknown says that no row of the drug is for the ordered indication
// (R10).
func (w *work) indicationUnknown(field string, fors []string) refusal.Reason {
	return refusal.Reason{
		Code: refusal.ValueUnknown, Field: "indication",
		Got: w.o.Indication.Text, Want: joinOr(unique(fors)),
		Rule: "R10", Pos: w.o.Indication.Pos,
		Message: fmt.Sprintf("the formulary has no %s of %s for %q",
			field, w.plan.Drug.Name, w.o.Indication.Value),
		Remedy: "write indication = one of: " + joinOr(unique(fors)),
	}
}

// ageMissing says that the rows go by age and the patient has none (R10).
func (w *work) ageMissing(field string) refusal.Reason {
	return refusal.Reason{
		Code: refusal.AgeMissing, Field: "patient.age",
		Want: `an age such as "82 years"`, Rule: "R10",
		Pos: w.patient.Pos,
		Message: fmt.Sprintf("the %s limits of %s depend on age, and the patient has none",
			field, w.plan.Drug.Name),
		Remedy: "write the patient's age",
	}
}

// ageOutside says that no row covers the patient's age (R10).
func (w *work) ageOutside(field string, bands []string) refusal.Reason {
	return refusal.Reason{
		Code: refusal.AgeOutside, Field: "patient.age",
		Got: w.size.Age.String(), Want: joinOr(unique(bands)),
		Rule: "R10", Pos: w.patient.Age.Pos,
		Message: fmt.Sprintf("the formulary has no %s of %s for a patient of %s",
			field, w.plan.Drug.Name, w.size.Age),
		Remedy: "check the age; add the age band with its source to the formulary (whoever keeps it does that) " +
			"if it is right",
	}
}

func (w *work) routeUnlisted(routes []string) bool {
	return w.refuse(refusal.Reason{
		Code: refusal.RouteNotListed, Field: "route",
		Got: w.plan.Route, Want: joinOr(unique(routes)),
		Rule: "R10", Pos: w.o.Pos,
		Message: fmt.Sprintf("the formulary lists no dose of %s by the route %q", w.plan.Drug.Name, w.plan.Route),
		Remedy: "check the route; add it with its source to the formulary (whoever keeps it does that) " +
			"if it is right",
	})
}

func unique(list []string) []string {
	var out []string
	for _, s := range list {
		if !routeListed(out, s) {
			out = append(out, s)
		}
	}
	return out
}
