package main

import (
	"fmt"
	"io"
	"math/big"
	"strings"

	"drawup/dilution"
	"drawup/dilution/body"
	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

func localFlags() []flagSpec {
	return []flagSpec{
		{"give", "lidocaine 1 %, 10 mL", `a local anaesthetic and its volume, again for each drug and site; ", at most 7 mg/kg" behind it sets its maximum`},
		{"weight", "72 kg", "body weight, where a maximum is per kg"},
		{"age", "54 years", "the patient's age, where maxima depend on it"},
		{"formulary", "my-site.toml", "the site's own formulary file, over the starter"},
	}
}

// A localJSON is one local anaesthetic against its maximum.
type localJSON struct {
	Drug       string        `json:"drug"`
	Amount     *quantityJSON `json:"amount"`
	Most       *quantityJSON `json:"maximum"`
	Share      *quantityJSON `json:"share"` // amount of maximum, in per cent
	MostVolume *quantityJSON `json:"maximum_volume"`
	LeftVolume *quantityJSON `json:"volume_left,omitempty"`
	Limit      string        `json:"limit"` // the figure behind the maximum
	Source     string        `json:"source"`
}

// A localDocument is the answer of drawup local.
type localDocument struct {
	Given []localJSON   `json:"given,omitempty"`
	Share *quantityJSON `json:"share,omitempty"` // all shares together, in per cent
	patientJSON
	findings
}

func runLocal(e env, args []string) int {
	r := newRequest("local", localFlags(), args)
	if r.help {
		return showHelp(e, "local")
	}
	doc := &localDocument{}
	r.need("give", "there is nothing to add up")
	sum := dilution.LocalSum{Weight: readWeight(r), Age: read(r, "age", body.ParseAge), Style: r.style}
	for _, text := range r.texts["give"].all {
		sum.Given = append(sum.Given, readGiven(r, text))
	}
	if !r.refused() {
		doc.work(r, sum)
	}
	if r.refused() {
		doc = &localDocument{}
	}
	return r.finish(e, doc, func(w io.Writer) { tellLocal(w, doc) })
}

// readGiven reads "lidocaine 1 %, 10 mL, at most 7 mg/kg". The name ends where
// the strength begins.
func readGiven(r *request, text string) dilution.LocalGiven {
	var g dilution.LocalGiven
	parts := listed(text)
	at := strings.IndexAny(parts[0], "0123456789.")
	if at <= 0 {
		r.add(refusal.Reason{
			Code: refusal.QuantityMissing, Field: "--give", Got: text, Want: "a name and a strength",
			Message: fmt.Sprintf("--give: got %q, want a name, its strength and a volume", text), Remedy: r.remedyFor("give"),
		})
		return g
	}
	field := "--give " + strings.TrimSpace(parts[0][:at])
	g.Drug = strings.TrimSpace(parts[0][:at])
	g.Concentration = readText(r, field, parts[0][at:], quantity.ParseConcentration)
	for _, p := range parts[1:] {
		most, ok := strings.CutPrefix(strings.TrimSpace(p), "at most ")
		switch {
		case !ok && g.Volume.Given():
			r.add(refusal.Reason{
				Code: refusal.FlagConflict, Field: "--give", Got: p, Want: "one volume for each --give",
				Message: fmt.Sprintf("%s: got %q as well as a volume", field, p), Remedy: "write a --give of its own for each site",
			})
		case !ok:
			g.Volume = readText(r, field, p, quantity.ParseVolume)
		default:
			readMost(r, &g, field, most)
		}
	}
	return g
}

// readMost is a maximum that the user sets: per kg, or in all.
func readMost(r *request, g *dilution.LocalGiven, field, text string) {
	d := readText(r, field+", at most", text, quantity.ParseDose)
	switch d.Basis() {
	case quantity.Absolute:
		g.MostInAll, _ = d.Amount()
	case quantity.PerKilogram:
		g.MostPerKg = d
	case quantity.PerSquareMetre:
		r.add(refusal.Reason{
			Code: refusal.UnitWrongKind, Field: field, Got: text, Want: "a dose in all or per kg", Rule: "R3",
			Message: field + ": maxima of local anaesthetics are per kg or in all, not per m²", Remedy: "check the unit",
		})
	}
}

func (d *localDocument) work(r *request, sum dilution.LocalSum) {
	f, ok := r.formulary()
	if !ok {
		return
	}
	shares, total, reasons := sum.Work(f)
	r.faults = append(r.faults, inFlags(reasons)...)
	if r.refused() {
		return
	}
	d.patientJSON = patient{weight: sum.Weight}.echo(r.style)
	stored, by := false, ""
	for _, s := range shares {
		d.Given = append(d.Given, localJSON{
			Drug: s.Drug, Amount: amountJSON(r.style, s.Amount), Most: amountJSON(r.style, s.Most), Share: shareJSON(r.style, s.Share),
			MostVolume: notAbove(r.style, s.MostVolume), LeftVolume: notAbove(r.style, s.LeftVolume), Limit: s.Words, Source: s.Source,
		})
		stored = stored || !s.Typed
		if s.By != 0 && s.By != body.None && s.By != body.Actual {
			by = s.By.String()
		}
	}
	d.Share = shareJSON(r.style, total)
	d.cautions(r, f, stored, by)
}

// cautions says what the maxima rest on.
func (d *localDocument) cautions(r *request, f *formulary.Formulary, stored bool, by string) {
	words := "the shares count everything that was named here, and nothing that the patient has had before"
	if stored {
		words = "maxima from the " + f.State() + "; " + words
	}
	if by != "" {
		words += "; an order would go by " + by + " weight, and the weight given is taken as that"
	}
	r.caution(refusal.Reason{
		Code: refusal.QuickCheck, Field: "--give", Rule: "R13", Message: words,
		Remedy: "count in every local anaesthetic of the day, from everybody",
	})
}

// notAbove is the most that may be given, printed rounded down to 0.1 mL: half up
// would carry it past the maximum.
func notAbove(s quantity.Style, v quantity.Volume) *quantityJSON {
	q := volumeJSON(s, v)
	if down, _, err := v.ToStep(quantity.Millilitres(big.NewRat(1, 10)), quantity.Down); err == nil {
		q.Printed = s.Volume(down)
	}
	return q
}

// shareJSON is a share of one in per cent.
func shareJSON(s quantity.Style, x *big.Rat) *quantityJSON {
	return percentJSON(s, quantity.PerCent(new(big.Rat).Mul(x, big.NewRat(100, 1))))
}

func tellLocal(w io.Writer, d *localDocument) {
	if len(d.Given) == 1 && d.Given[0].Share.Exact == "0" {
		fmt.Fprintf(w, "%s at the most\n", d.Given[0].MostVolume.Printed)
	} else {
		fmt.Fprintf(w, "%s of the maximum, all together\n", shown(d.Share))
	}
	for _, x := range d.Given {
		line(w, x.Drug, fmt.Sprintf("%s of %s (%s): %s of it; at most %s, room for %s more", shown(x.Amount), shown(x.Most), x.Limit,
			shown(x.Share), x.MostVolume.Printed, x.LeftVolume.Printed))
		line(w, "", "maximum: "+x.Source)
	}
	d.patientJSON.tell(w)
}
