package main

import (
	"fmt"
	"io"
	"regexp"
	"strings"
	"time"

	"drawup/dilution/formulary"
	"drawup/dilution/refusal"
	"drawup/labels"
	"drawup/labels/gs1"
)

// spanWords is a span in hours and minutes, from two days on in days.
func spanWords(minutes int64) string {
	if days := minutes / (24 * 60); days >= 2 {
		return fmt.Sprintf("%d days", days)
	}
	return labels.Span(minutes)
}

// name puts in what the drug is called, and whether the formulary is ours.
func (r *readRequest) name(doc *readDocument, c labels.Coded, form *formulary.Formulary, products []labels.Product) {
	drug := &codedDrug{ATC: c.ATC, Names: []string{}}
	for _, d := range form.Drugs() {
		if c.ATC != "" && d.ATC == c.ATC {
			drug.Names = append(drug.Names, d.LabelName(r.style))
		}
	}
	for _, p := range products {
		if c.Number == "" || p.Number.Value != c.Number {
			continue
		}
		if d, _, ok := form.Find(p.Name); ok {
			drug.ATC, drug.Names = d.ATC, []string{d.LabelName(r.style)}
		}
		doc.Concentration, doc.Volume = concentrationJSON(r.style, p.Concentration.Value), volumeJSON(r.style, p.Volume.Value)
	}
	if drug.ATC != "" {
		doc.Drug = drug
	}
	if c.Kind != labels.KindOther && len(drug.Names) == 0 {
		r.faults = append(r.faults, noDrug(c, r.order.given))
	}
	if c.Formulary == "" {
		return
	}
	here := form.Digest[:labels.CodedDigest]
	doc.Formulary = &codedDigest{Digest: c.Formulary, Here: here, Same: here == c.Formulary}
	if !doc.Formulary.Same {
		r.faults = append(r.faults, refusal.Reason{
			Code: refusal.CodeFormulary, Severity: refusal.Caution, Field: "(95)", Got: c.Formulary, Want: here, Rule: "R19",
			Message: "the label was made from another formulary than the one here, or from another version of it",
			Remedy:  "limits and names here may differ from those that the label was made by; ask the owner of the formulary",
		})
	}
}

// noDrug is the caution of a code whose drug has no name here.
func noDrug(c labels.Coded, order bool) refusal.Reason {
	out := refusal.Reason{Code: refusal.CodeDrug, Severity: refusal.Caution, Field: "(91)", Got: c.ATC, Want: "a drug of this formulary", Rule: "R10"}
	switch {
	case c.ATC != "":
		out.Message = fmt.Sprintf("this formulary has no drug with the ATC code %s", c.ATC)
		out.Remedy = "go by the name in print"
	case order:
		out.Field, out.Got = "(01)", c.Number
		out.Message = "the code names no drug, and the order has no such GTIN"
		out.Remedy = "go by the name in print"
	default:
		out.Field, out.Got = "(01)", c.Number
		out.Message = "the code names a product by its number alone; which drug that is stands in no code and in no list here"
		out.Remedy = "go by the name in print; for the site's own GTINs add --order with an order that lists them"
	}
	return out
}

// until puts in the use-by, and a caution when it is past.
func (r *readRequest) until(doc *readDocument, c labels.Coded, now time.Time) {
	if c.UseBy.IsZero() {
		return
	}
	u := useByOf(r.style, c, now)
	doc.UseBy = u
	if !u.Past {
		return
	}
	r.faults = append(r.faults, refusal.Reason{
		Code: refusal.CodePast, Severity: refusal.Caution, Field: "use-by", Got: u.Printed, Want: "a time after " + labels.Moment(r.style, now), Rule: "R18",
		Message: fmt.Sprintf("the use-by time %s passed %s before %s", u.Printed, u.span, labels.Moment(r.style, now)),
		Remedy:  "do not use it; discard it as the house's rules say",
	})
}

// within is the beginning of another element in a value: the expiry, batch or
// serial of a pack.
var within = regexp.MustCompile(`^.+?(17\d{6}|21.|10.|11\d{6})`)

// doubts warns of values that may hold the next one: a product whose code came
// without any separator, and whose last value is of no fixed length and reads as
// if more stood in it.
func (r *readRequest) doubts(s gs1.Scanned) {
	last := s.Elements[len(s.Elements)-1]
	if s.Bracketed || s.Separators > 0 || len(s.Elements) < 2 || s.Elements[0].AI != "01" {
		return
	}
	if last.AI != "10" && last.AI != "21" || !within.MatchString(last.Value) {
		return
	}
	r.faults = append(r.faults, refusal.Reason{
		Code: refusal.CodeRunTogether, Severity: refusal.Caution, Field: "(" + last.AI + ")", Got: last.Value, Want: "a separator where the value ends",
		Pos: refusal.Pos{Column: last.ValueAt}, Source: "GS1 General Specifications: a separator ends every value whose length is not predefined",
		Message: fmt.Sprintf("at character %d: %q may be one value, or two that run together; the code came without any separator", last.ValueAt, last.Value),
		Remedy:  "compare with the print; set the scanner to send GS (29) or <GS>",
	})
}

// tellRead writes the answer for people: first what it is, then line by line.
func tellRead(w io.Writer, d *readDocument) {
	fmt.Fprintln(w, headline(d))
	tell := func(name, value string) {
		if value != "" {
			line(w, name, value)
		}
	}
	tell("product number", d.Number)
	if d.Drug != nil {
		names := "not in this formulary"
		if len(d.Drug.Names) > 0 {
			names = labels.Capital(strings.Join(d.Drug.Names, ", or "))
		}
		tell("drug", fmt.Sprintf("%s (ATC %s)", names, d.Drug.ATC))
	}
	for _, q := range []struct {
		name  string
		value *quantityJSON
	}{{"concentration", d.Concentration}, {"second concentration", d.Second}, {"amount", d.Amount}, {"volume", d.Volume}} {
		if q.value != nil {
			tell(q.name, q.value.Printed)
		}
	}
	if u := d.UseBy; u != nil {
		words := u.Printed
		if u.whole != "" {
			words += ", " + u.whole
		}
		switch {
		case u.Past:
			words += ": PAST, " + u.span + " ago"
		case u.span == "":
			words += ": this minute"
		default:
			words += ": in " + u.span
		}
		tell("use by", words)
	}
	tell("batch", d.Batch)
	tell("serial", d.Serial)
	if f := d.Formulary; f != nil {
		words := "the same as here"
		if !f.Same {
			words = "another than here (" + f.Here + ")"
		}
		tell("formulary", f.Digest+": "+words)
	}
	tellOthers(w, d)
}

// tellOthers lists the elements that no line above has said.
func tellOthers(w io.Writer, d *readDocument) {
	for _, e := range d.Elements {
		if said(d, e.Identifier) {
			continue
		}
		title := e.Title
		if title == "" {
			title = "without a title"
		}
		line(w, "("+e.Identifier+")", e.Value+", "+title)
	}
}

// said reports that a line of the answer holds the element.
func said(d *readDocument, identifier string) bool {
	switch identifier {
	case "01", "7003":
		return true
	case "10":
		return d.Batch != ""
	case "21":
		return d.Serial != ""
	case "17":
		for _, e := range d.Elements {
			if e.Identifier == "7003" {
				return false
			}
		}
		return true
	case "91":
		return d.Drug != nil
	case "92":
		return d.Kind == "label"
	case "93":
		return d.Concentration != nil
	case "94":
		return d.Amount != nil
	case "95":
		return d.Formulary != nil
	case "96":
		return d.Second != nil
	}
	return false
}

// headline is what the code is, for a glance.
func headline(d *readDocument) string {
	what := map[string]string{"label": "a label of this program", "product": "a product", "other": "a code of no label and no product"}[d.Kind]
	if d.Drug != nil && len(d.Drug.Names) > 0 && d.Concentration != nil {
		what = labels.Capital(d.Drug.Names[0]) + " " + d.Concentration.Printed
	}
	if d.UseBy != nil && d.UseBy.Past {
		return "do not use: " + what + ", past its use-by time"
	}
	return what
}
