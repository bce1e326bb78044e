package lint_test

import (
	"fmt"
	"strings"
	"testing"

	"drawup/dilution/quantity/lint"
)

func codes(found []lint.Finding) string {
	var out []string
	for _, f := range found {
		out = append(out, f.Rule.Code)
	}
	return strings.Join(out, " ")
}

func breaks(found []lint.Finding, code string) bool {
	for _, f := range found {
		if f.Rule.Code == code {
			return true
		}
	}
	return false
}

// Every rule finds its wrong examples and lets its right ones pass. They are
// those of the lists named beside each rule; the Go expressions and examples of
// N01 to N15 were read off those lists once, before this package was written.
func TestExamples(t *testing.T) {
	for _, r := range lint.Rules() {
		find := func(text string) []lint.Finding { return lint.UK().Typed(text) }
		if r.Scope == lint.WholeLabel {
			find = func(text string) []lint.Finding {
				drug, lines, _ := strings.Cut(text, "|")
				return lint.UK().Whole(drug, strings.Split(lines, "|"))
			}
		}
		if r.Scope == lint.OnPaper {
			if r.Held == "" || len(r.Wrong)+len(r.Right) > 0 {
				t.Errorf("%s: got no word on what holds it on paper", r.Code)
			}
			continue
		}
		if len(r.Wrong) == 0 || len(r.Right) == 0 {
			t.Errorf("%s has no examples", r.Code)
		}
		for _, text := range r.Wrong {
			if !breaks(find(text), r.Code) {
				t.Errorf("%s: lets %q pass", r.Code, text)
			}
		}
		for _, text := range r.Right {
			if breaks(find(text), r.Code) {
				t.Errorf("%s: stops %q", r.Code, text)
			}
		}
	}
}

// N01 to N28 are all there, each once, with a sentence, a source, a severity.
func TestAllRulesAreThere(t *testing.T) {
	seen := map[string]bool{}
	for _, r := range lint.Rules() {
		if seen[r.Code] || r.Says == "" || r.Fault == "" || strings.ContainsAny(r.Fault, "0123456789") || r.Source == "" || r.Severity == 0 || r.Scope == 0 {
			t.Errorf("%s: twice, or something is missing: %+v", r.Code, r)
		}
		seen[r.Code] = true
		if _, ok := lint.Lookup(r.Code); !ok {
			t.Errorf("%s is not found by its code", r.Code)
		}
	}
	for n := 1; n <= 28; n++ {
		if code := fmt.Sprintf("N%02d", n); !seen[code] {
			t.Errorf("there is no %s", code)
		}
	}
	if len(seen) != 30 || !seen["N06b"] || !seen["N08b"] {
		t.Errorf("got %d rules, want 28 and N06b, N08b", len(seen))
	}
}
