package main

import (
	"bytes"
	"fmt"
	"io"

	"drawup/dilution/refusal"
	"drawup/labels/sheets"
	"drawup/layouts"
	"drawup/layouts/pdf"
)

// runFormularyPrint writes the formulary as a PDF for two people to sign.
func runFormularyPrint(e env, r *formularyRequest) int {
	if !r.out.given {
		r.out = onceText{text: "formulary.pdf", given: true}
	}
	f, faults := r.open(e)
	day, late := r.day(e)
	if faults = append(faults, late...); faults.Refused() {
		return finish(e, r.json, &bareDocument{}, nil, faults)
	}
	pages, faults := layouts.Book(sheets.FormularyBook(f, day.Format("02 Jan 2006")))
	if faults.Refused() {
		return finish(e, r.json, &bareDocument{}, nil, faults)
	}
	var b bytes.Buffer
	if err := pdf.Write(&b, pdf.Document{Pages: pages, Title: f.Name + " " + f.Version + ", digest " + f.Digest,
		Subject: f.State(), Creator: "drawup", Language: "en-GB", Made: day}); err != nil {
		return finish(e, r.json, &bareDocument{}, nil, refusal.List{ourFault(0, err)})
	}
	if faults := writeAll([]file{{r.out.text, b.Bytes()}}, r.inputs()); faults.Refused() {
		return finish(e, r.json, &bareDocument{}, nil, faults)
	}
	return finish(e, r.json, &bareDocument{}, func(w io.Writer) {
		fmt.Fprintf(w, "%s, version %s, %d drugs on %d pages: %s\n", f.Name, f.Version, len(f.Drugs()), len(pages), r.out.text)
	}, nil)
}
