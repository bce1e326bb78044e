package labels

import (
	_ "embed" // the table of classes
	"encoding/csv"
	"fmt"
	"strings"
	"sync"

	"drawup/dilution/refusal"
)

// A Scheme is the classes of one edition of ISO 26825, with at most one regional
// option. A site picks one; labels of two schemes never stand on one sheet.
type Scheme struct {
	Edition string // "2008", "2020"
	Region  string // "" or "teal"
	classes []Class
}

// Editions lists the editions that a site may pick, Regions the options.
func Editions() []string { return []string{"2008", "2020"} }
func Regions() []string  { return []string{"teal"} }

//go:embed classes.csv
var classTable string

// schemes are read once, in the order of the table: editions, then each with
// each regional option.
var schemes = sync.OnceValue(func() []Scheme {
	rows, err := readClasses(classTable)
	if err != nil {
		panic(err) // the table is part of the program; a test reads it
	}
	var out []Scheme
	for _, edition := range Editions() {
		plain := Scheme{Edition: edition}
		for _, r := range rows {
			if r.scheme == edition {
				c := r.class
				c.Edition = edition
				plain.classes = append(plain.classes, c)
			}
		}
		out = append(out, plain)
		for _, region := range Regions() {
			out = append(out, plain.with(region, rows))
		}
	}
	return out
})

// with is the scheme with the rows of a regional option in place of its own.
func (s Scheme) with(region string, rows []classRow) Scheme {
	out := Scheme{Edition: s.Edition, Region: region, classes: append([]Class{}, s.classes...)}
	for i := range out.classes {
		for _, r := range rows {
			if r.scheme == region && r.class.Code == out.classes[i].Code {
				out.classes[i] = r.class
			}
		}
		out.classes[i].Edition, out.classes[i].Region = s.Edition, region
	}
	return out
}

// A classRow is one row of the table.
type classRow struct {
	scheme string
	class  Class
}

// readClasses reads the table of classes. It refuses a row that lacks a part, a
// colour or design that there is not, and a class that stands twice.
func readClasses(text string) ([]classRow, error) {
	r := csv.NewReader(strings.NewReader(text))
	r.Comment, r.FieldsPerRecord = '#', 8
	list, err := r.ReadAll()
	if err != nil {
		return nil, fmt.Errorf("classes: %w", err)
	}
	var out []classRow
	seen := map[string]bool{}
	for i, f := range list[1:] {
		row := classRow{scheme: f[0], class: Class{Code: f[1], Parent: f[2], Word: f[3], Basis: f[6], Why: f[7]}}
		fill, ok := hue(f[4])
		if !ok || f[1] == "" || f[3] == "" || f[7] == "" || seen[f[0]+" "+f[1]] {
			return nil, fmt.Errorf("classes: row %d: got %q, want a class once, with code, word, colour and reason", i+1, f)
		}
		seen[f[0]+" "+f[1]] = true
		row.class.Fill = fill
		switch f[5] {
		case "plain":
		case "stripes":
			row.class.Stripes = true
		case "stripes+line":
			row.class.Stripes, row.class.Line = true, true
		case "bar":
			row.class.Bar, row.class.LetterOnBar = true, white
		default:
			return nil, fmt.Errorf("classes: row %d: got design %q, want plain, stripes, stripes+line or bar", i+1, f[5])
		}
		switch f[6] {
		case "clause", "summary", "reading":
		default:
			return nil, fmt.Errorf("classes: row %d: got basis %q, want clause, summary or reading", i+1, f[6])
		}
		out = append(out, row)
	}
	return out, nil
}

// SchemeOf finds the scheme of an edition, [Edition] for "", with a regional
// option, none for "".
func SchemeOf(edition, region string) (Scheme, bool) {
	if edition == "" {
		edition = Edition
	}
	for _, s := range schemes() {
		if s.Edition == edition && s.Region == region {
			return s, true
		}
	}
	return Scheme{}, false
}

// Classes lists the classes of the scheme in a fixed order.
func (s Scheme) Classes() []Class { return append([]Class{}, s.classes...) }

// Class finds a class by its code. An unknown code is no class: nothing is
// derived from a drug's name or code.
func (s Scheme) Class(code string) (Class, bool) {
	for _, c := range s.classes {
		if c.Code == code {
			return c, true
		}
	}
	return Class{}, false
}

// Classes lists the classes of [Edition], without a regional option.
func Classes() []Class {
	s, _ := SchemeOf(Edition, "")
	return s.Classes()
}

// ClassOf finds a class of [Edition] by its code.
func ClassOf(code string) (Class, bool) {
	s, _ := SchemeOf(Edition, "")
	return s.Class(code)
}

// OneScheme refuses labels of two editions or regional options together: the
// same drug would look in two ways on one bench.
func OneScheme(list []Label) refusal.List {
	for _, l := range list {
		a, b := list[0].Class, l.Class
		if b.Code == "" || a.Code == "" {
			continue // no class at all is a fault of its own
		}
		if a.Edition != b.Edition || a.Region != b.Region {
			return refusal.List{{Code: refusal.KeyConflict, Severity: refusal.Refuse, Syringe: l.Number, Field: "site.edition",
				Got: strings.TrimSpace(a.Edition+" "+a.Region) + " and " + strings.TrimSpace(b.Edition+" "+b.Region), Want: "one edition for all labels of a site", Rule: "R16",
				Message: "The labels follow two schemes of colours and designs, and a site may have only one.",
				Remedy:  "prepare the orders with one edition and one regional option"}}
		}
	}
	return nil
}
