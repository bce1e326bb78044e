package formulary_test

import (
	"fmt"
	"math/big"
	"strings"
	"testing"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
)

// A published figure is one row of the tables of second sources.
type published struct{ drug, what, figure, source string }

// Every shipped limit against second sources: of each drug and kind of figure,
// the loosest published one. The starter may be more cautious than all of them;
// it may be looser than the row's figure only where its own source prints more,
// which the table then has as a row too. Sources are named beside each figure
// (testdata/formulary/limits).
func TestLimitsAgainstSecondSources(t *testing.T) {
	f := starter(t)
	by := map[string][]published{}
	n := 0
	for _, r := range rows(t, "limits", 4) {
		p := published{r[0], r[1], r[2], r[3]}
		if p.source == "" {
			t.Errorf("%s, %s %s: no source", p.drug, p.what, p.figure)
		}
		if _, _, ok := f.Find(p.drug); !ok {
			t.Errorf("%s is in the table and not in the formulary", p.drug)
			continue
		}
		by[p.drug+"|"+p.what] = append(by[p.drug+"|"+p.what], p)
		n++
	}
	for _, list := range by {
		d, _, _ := f.Find(list[0].drug)
		againstSecond(t, d, list)
	}
	if n < 150 {
		t.Errorf("got %d published figures, want a second source for most drugs", n)
	}
}

// againstSecond wants a shipped figure of one kind less than ten times looser
// than one of the published ones, and not a hundred times more cautious: a
// decimal point or a unit that slipped in either copy would part them.
func againstSecond(t *testing.T, d formulary.Drug, list []published) {
	t.Helper()
	what := list[0].what
	var shipped []string
	near, alike := false, false
	for _, x := range shippedOf(d, what) {
		shipped = append(shipped, x.text)
		for _, p := range list {
			v, err := amountOfText(what, p.figure)
			if err != nil {
				t.Errorf("%s, %s: %q: %v", d.Name, what, p.figure, err)
				continue
			}
			if v.basis != x.basis || v.kind != x.kind {
				continue
			}
			alike = true
			ratio := new(big.Rat).Quo(x.value, v.value)
			if strings.HasSuffix(what, "low") {
				ratio.Inv(ratio) // a higher lower end is the cautious one
			}
			if ratio.Cmp(big.NewRat(10, 1)) < 0 && ratio.Cmp(big.NewRat(1, 100)) > 0 {
				near = true
			}
		}
	}
	if alike && !near {
		var texts []string
		for _, p := range list {
			texts = append(texts, p.figure+" ("+p.source+")")
		}
		t.Errorf("%s, %s: shipped %s, published %s", d.Name, what, strings.Join(shipped, ", "), strings.Join(texts, ", "))
	}
}

// A plainFigure is a figure as a bare number with what it counts.
type plainFigure struct {
	text  string
	value *big.Rat
	basis quantity.Basis
	kind  quantity.Kind
}

func amountOfText(what, text string) (plainFigure, error) {
	switch {
	case strings.HasPrefix(what, "concentration"):
		c, err := quantity.ParseConcentration(text)
		if err != nil {
			return plainFigure{}, err
		}
		return plainFigure{text, c.Rat(), 0, c.Kind()}, nil
	case strings.HasPrefix(what, "rate"):
		r, err := quantity.ParseDoseRate(text)
		if err != nil {
			return plainFigure{}, err
		}
		return plainFigure{text, r.Rat(), r.Basis(), r.Kind()}, nil
	case strings.HasPrefix(what, "dose"), what == "total max":
		x, err := quantity.ParseDose(text)
		if err != nil {
			return plainFigure{}, err
		}
		return plainFigure{text, x.Rat(), x.Basis(), x.Kind()}, nil
	}
	return plainFigure{}, fmt.Errorf("got the kind %q, which the test does not know", what)
}

// shippedOf is every figure of the kind that the drug's record has.
func shippedOf(d formulary.Drug, what string) []plainFigure {
	var out []plainFigure
	for _, e := range d.Entries() {
		group, item, _ := strings.Cut(e.Name, ": ")
		var kind string
		switch {
		case strings.HasPrefix(group, "concentration"):
			kind = map[string]string{"lowest": "concentration low", "highest": "concentration high"}[item]
		case strings.HasPrefix(group, "dose rate"):
			kind = highLow("rate ", item)
		case strings.HasPrefix(group, "dose"):
			kind = highLow("dose ", item)
			if item == "absolute maximum" || item == "maximum of a day" || item == "maximum of a course" {
				kind = "total max"
			}
		case strings.HasPrefix(group, "local anaesthetic maximum"):
			kind = "total max"
		}
		if kind != what {
			continue
		}
		if p, err := amountOfText(what, e.Text); err == nil {
			out = append(out, p)
		}
	}
	return out
}

func highLow(what, item string) string {
	switch item {
	case "hard minimum", "usual lowest":
		return what + "low"
	case "usual highest", "soft maximum", "hard maximum":
		return what + "high"
	}
	return ""
}
