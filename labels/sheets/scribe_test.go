package sheets

import (
	"testing"

	"drawup/dilution/refusal"
	"drawup/labels"
)

// A card that has not room for every caution keeps those that touch a limit,
// then those of time; what was chosen from the formulary comes last.
func TestGravestCautionsComeFirst(t *testing.T) {
	var list []Caution
	for _, c := range []refusal.Code{refusal.Unverified, refusal.RateSlow, refusal.WeightEstimated, refusal.RunsPastUseBy, refusal.RateAboveSoft, refusal.NegligibleDisplacement} {
		list = append(list, Caution{Text: labels.Words(string(c)), Code: string(c)})
	}
	want := []refusal.Code{refusal.RateAboveSoft, refusal.RunsPastUseBy, refusal.RateSlow, refusal.WeightEstimated, refusal.Unverified, refusal.NegligibleDisplacement}
	for i, c := range gravest(list) {
		if c.Code != string(want[i]) {
			t.Errorf("place %d: got %s, want %s", i+1, c.Code, want[i])
		}
	}
}

// A sentence of the formulary with figures is printed word for word, its full
// stop apart; one without figures may get a capital.
func TestNotesWordForWord(t *testing.T) {
	s := scribe{rows: newRegister(PaperCheck)}
	line := s.note("give over 30 to 60 s")
	if len(line) != 2 || line[0].Text != "give over 30 to 60 s" || line[0].Figure != "said.2001.text" || line[1].Text != "." || line[1].Figure != "" {
		t.Errorf("got %+v, want the sentence under its name and a full stop", line)
	}
	if again := s.note("give over 30 to 60 s"); again[0].Figure != line[0].Figure {
		t.Errorf("got %s and %s for one sentence, want one name", line[0].Figure, again[0].Figure)
	}
	if other := s.bound("60 mg"); other[0].Figure != "bound.2002.text" {
		t.Errorf("got %s, want the next row", other[0].Figure)
	}
	if plain := s.note("into a vein only"); len(plain) != 1 || plain[0].Text != "Into a vein only." || plain[0].Figure != "" {
		t.Errorf("got %+v, want plain words with a capital", plain)
	}
}
