package layouts

import (
	"fmt"
	"slices"

	"drawup/dilution/refusal"
	"drawup/labels/sheets"
	"drawup/layouts/ink"
)

// Sheets places sheets on pages, numbered through as one file. Proofs are by
// syringe number. Every figure of a sheet must be covered by the proof of its
// syringe (no ink without a second route); text that does not fit, or that no
// face can show, is refused and never cut. A refusal gives no page at all.
func Sheets[P Proof](list []sheets.Sheet, passed map[int]P) ([]ink.Page, refusal.List) {
	var refused refusal.List
	for _, s := range list {
		refused = append(refused, unproven(s, passed)...)
		refused = append(refused, unshowable(s)...)
	}
	if refused.Refused() {
		return nil, refused
	}
	var pages []ink.Page
	var feet []footing
	for _, s := range list {
		f := newFlow(s)
		f.run()
		refused = append(refused, f.refused...)
		pages = append(pages, f.pages...)
		for range f.pages {
			feet = append(feet, f.foot)
		}
	}
	if refused.Refused() {
		return nil, refused
	}
	for i := range pages {
		pages[i].Add(feet[i].marks(i+1, len(pages))...)
	}
	return pages, nil
}

// unproven refuses a sheet that prints a figure nobody has worked again.
func unproven[P Proof](s sheets.Sheet, passed map[int]P) refusal.List {
	var refused refusal.List
	for _, n := range s.Syringes() {
		proof, ok := passed[n]
		if ok && proof.Covers(s.FiguresOf(n)) {
			continue
		}
		refused = append(refused, refusal.Reason{Code: refusal.RoutesDisagree, Severity: refusal.Refuse, Syringe: n, Field: s.Paper, Rule: "R17",
			Message: fmt.Sprintf("The figures of syringe %d on the %s have not passed the second route.", n, s.Paper),
			Got:     "figures that were not worked again", Want: "every figure worked again from the printed words",
			Remedy: "report this fault of the program; make the syringe by hand calculation"})
	}
	return refused
}

// unshowable refuses a sheet with a letter that one of the faces lacks.
func unshowable(s sheets.Sheet) refusal.List {
	f := s.Foot
	var missing []rune
	for _, text := range append(s.Text(), f.Made, f.Preparer, f.Place, f.Formulary, f.State, f.LeftOut, s.Bookmark) {
		for _, face := range []ink.Face{ink.Regular, ink.Bold, ink.CondensedRegular, ink.CondensedSemiBold} {
			for _, r := range Missing(text, face) {
				if !slices.Contains(missing, r) {
					missing = append(missing, r)
				}
			}
		}
	}
	if len(missing) == 0 {
		return nil
	}
	return refusal.List{{Code: refusal.GlyphMissing, Severity: refusal.Refuse, Syringe: s.Syringe, Field: s.Paper,
		Message: fmt.Sprintf("The %s holds letters that cannot be printed: %q.", s.Paper, string(missing)),
		Got:     string(missing), Want: "letters of the Latin script", Remedy: "write the text without them"}}
}
