package recheck

import (
	"errors"
	"strings"
	"testing"
)

// list turns "name = text" lines into figures of one paper. Blank lines are
// passed over.
func list(t testing.TB, paper, lines string) []Figure {
	t.Helper()
	var out []Figure
	for _, line := range strings.Split(lines, "\n") {
		if strings.TrimSpace(line) == "" {
			continue
		}
		name, text, ok := strings.Cut(line, " = ")
		if !ok {
			t.Fatalf("line %q has no \" = \"", line)
		}
		out = append(out, Figure{Paper: paper, Name: strings.TrimSpace(name), Text: text})
	}
	return out
}

// stated builds a Stated for an invented presentation whose lines are given.
func stated(t testing.TB, recordLines, asked, figures string) Stated {
	t.Helper()
	return Stated{
		Syringe: "1", Drug: "invented", Presentation: "a",
		Record:  []byte("[[drug]]\nname = \"invented\"\n[[drug.presentation]]\nid = \"a\"\n" + recordLines),
		Asked:   list(t, "order", asked),
		Figures: list(t, "draw-up", figures),
	}
}

func agrees(t *testing.T, what string, s Stated) {
	t.Helper()
	passed, err := Check(s)
	if err != nil {
		t.Errorf("%s: got %v, want agreement", what, err)
		return
	}
	if !passed.Covers(s.Figures) {
		t.Errorf("%s: the passed set does not cover its own figures", what)
	}
}

// disagreesAt wants a fault at every one of the names.
func disagreesAt(t *testing.T, what string, s Stated, names ...string) *Disagreement {
	t.Helper()
	passed, err := Check(s)
	var d *Disagreement
	if !errors.As(err, &d) {
		t.Errorf("%s: got error %v, want a *Disagreement", what, err)
		return &Disagreement{}
	}
	if passed.Covers(nil) {
		t.Errorf("%s: a refused set covers figures", what)
	}
	for _, name := range names {
		found := false
		for _, f := range d.Faults {
			found = found || f.Name == name
		}
		if !found {
			t.Errorf("%s: no fault at %s in %v", what, name, d)
		}
	}
	return d
}

// with gives a copy of s in which every figure of this name shows text.
func (s Stated) with(name, text string) Stated {
	figures := make([]Figure, len(s.Figures))
	copy(figures, s.Figures)
	for i := range figures {
		if figures[i].Name == name {
			figures[i].Text = text
		}
	}
	s.Figures = figures
	return s
}

// without gives a copy of s that lacks every figure of this name.
func (s Stated) without(name string) Stated {
	var figures []Figure
	for _, f := range s.Figures {
		if f.Name != name {
			figures = append(figures, f)
		}
	}
	s.Figures = figures
	return s
}
