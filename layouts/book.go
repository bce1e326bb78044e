package layouts

import (
	"drawup/dilution/recheck"
	"drawup/dilution/refusal"
	"drawup/labels/sheets"
	"drawup/layouts/ink"
)

// Book places a formulary. Its pages are numbered through; the index in front
// names the page on which each drug begins. It prints records, not results: no
// figure of it is worked, so that no second route stands behind it.
func Book(b sheets.Book) ([]ink.Page, refusal.List) {
	body, refused := Sheets[recheck.Passed](b.Drugs, nil)
	front, more := Sheets[recheck.Passed]([]sheets.Sheet{b.Front(nil)}, nil)
	if refused = append(refused, more...); refused.Refused() {
		return nil, refused
	}
	pageOf := map[string]int{}
	for i, p := range body {
		if p.Bookmark != "" {
			pageOf[p.Bookmark] = len(front) + i + 1
		}
	}
	return Sheets[recheck.Passed](append([]sheets.Sheet{b.Front(pageOf)}, b.Drugs...), nil)
}
