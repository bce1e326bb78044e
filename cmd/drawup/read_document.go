package main

import (
	"time"

	"drawup/dilution/quantity"
	"drawup/labels"
	"drawup/labels/gs1"
)

// A readDocument is the answer of drawup read. What the code does not say is
// left out.
type readDocument struct {
	Kind          string        `json:"kind,omitempty"`   // label, product or other
	Symbol        string        `json:"symbol,omitempty"` // symbology identifier in front
	Elements      []elementJSON `json:"elements"`
	Drug          *codedDrug    `json:"drug,omitempty"`
	Concentration *quantityJSON `json:"concentration,omitempty"`
	Second        *quantityJSON `json:"second_concentration,omitempty"`
	Amount        *quantityJSON `json:"amount,omitempty"`
	Volume        *quantityJSON `json:"volume,omitempty"` // that a site's own number stands for
	UseBy         *codedUseBy   `json:"use_by,omitempty"`
	Number        string        `json:"product_number,omitempty"`
	Batch         string        `json:"batch,omitempty"`
	Serial        string        `json:"serial,omitempty"`
	Formulary     *codedDigest  `json:"formulary,omitempty"`
	findings
}

// An elementJSON is one element of the code as it stands. At is the character
// of the text where its identifier begins, counted from 1.
type elementJSON struct {
	Identifier string `json:"identifier"`
	Title      string `json:"title"`
	Value      string `json:"value"`
	At         int    `json:"at"`
}

// A codedDrug is the drug that a code names. Names are those of the formulary
// for its ATC code, or of the order for the site's own number; none when
// neither has it.
type codedDrug struct {
	ATC   string   `json:"atc,omitempty"`
	Names []string `json:"names"`
}

// A codedUseBy is until when, as the clock on the wall shows it, held against a
// clock. A day without a time lasts to its end, a month to its last day.
type codedUseBy struct {
	At        string `json:"at"`
	Printed   string `json:"printed"`
	Past      bool   `json:"past"`
	CheckedAt string `json:"checked_at"`
	whole     string // "to the end of the day", "to the end of the month"
	span      string // from the clock to it or from it to the clock, "7 h 30 min"; "" for less than a minute
}

// A codedDigest is the first digits of the formulary's digest on the label, and
// whether they are those of the formulary here.
type codedDigest struct {
	Digest string `json:"digest"`
	Here   string `json:"here"`
	Same   bool   `json:"same"`
}

// scanned lists the elements as they stand.
func (d *readDocument) scanned(s gs1.Scanned, kind labels.CodeKind) {
	d.Symbol = s.Symbol
	switch kind {
	case labels.KindLabel:
		d.Kind = "label"
	case labels.KindProduct:
		d.Kind = "product"
	case labels.KindOther:
		d.Kind = "other"
	}
	for _, e := range s.Elements {
		d.Elements = append(d.Elements, elementJSON{e.AI, gs1.Title(e.AI), e.Value, e.At})
	}
}

// coded puts the quantities and numbers in.
func (d *readDocument) coded(style quantity.Style, c labels.Coded) {
	if c.Concentration.Given() {
		d.Concentration = concentrationJSON(style, c.Concentration)
	}
	if c.Second.Given() {
		d.Second = concentrationJSON(style, c.Second)
	}
	if c.Amount.Given() {
		d.Amount = amountJSON(style, c.Amount)
	}
	d.Number, d.Batch, d.Serial = c.Number, c.Batch, c.Serial
}

// useByOf holds the use-by against now, both as clocks on the wall.
func useByOf(style quantity.Style, c labels.Coded, now time.Time) *codedUseBy {
	out := &codedUseBy{
		At: c.UseBy.Format("2006-01-02T15:04"), Printed: labels.Moment(style, c.UseBy),
		CheckedAt: now.Format("2006-01-02T15:04"), Past: now.After(c.UseBy),
	}
	switch {
	case c.WholeMonth:
		out.whole = "to the end of the month"
	case c.WholeDay:
		out.whole = "to the end of the day"
	}
	if c.WholeDay {
		out.Printed = labels.Moment(style, c.UseBy)[:len("02 Jan 2006")]
		if style.String() != "uk" {
			out.Printed = c.UseBy.Format("2006-01-02")
		}
	}
	if minutes := int64(c.UseBy.Sub(now).Abs() / time.Minute); minutes > 0 {
		out.span = spanWords(minutes)
	}
	return out
}
