package layouts

import (
	"drawup/dilution/refusal"
	page "drawup/labels/sheets"
	"drawup/layouts/ink"
)

// Sheets places sheets on pages, numbered through as one file. Proofs are by
// syringe number. A sheet with a figure that its syringe's proof does not
// cover is refused, as is a text that does not fit or cannot be set; then no
// page is returned.
func Sheets(list []page.Sheet, proofs map[int]Proof) ([]ink.Page, refusal.List) { return nil, nil }
