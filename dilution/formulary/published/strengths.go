package published

import (
	"fmt"
	"math/big"
	"slices"
	"strings"

	"drawup/dilution/formulary"
)

// A strength is one row of the tables of strengths: what one document says of
// one container.
type strength struct {
	drug           string
	powder         bool
	amount, second figure // per mL of a solution, per container of a powder
	volume         string // in mL, "" when the document does not say
}

func (t *Tables) readStrength(cells []string) error {
	if len(cells) != 7 || cells[6] == "" {
		return fmt.Errorf("got %d cells, want 7, the last with a source", len(cells))
	}
	amount, err := parse(cells[2] + " " + cells[3])
	if err != nil {
		return err
	}
	t.strengths = append(t.strengths, strength{drug: cells[0], powder: cells[1] == "powder", amount: amount, volume: cells[4]})
	return nil
}

// contents is what the record says of a container: amount, and volume in mL (of
// a powder, what is added to it).
func contents(p formulary.Presentation) (amount figure, volume *big.Rat, err error) {
	amount, err = parse(p.Amount.Written())
	if err != nil {
		return figure{}, nil, err
	}
	text := p.Volume.Written()
	if p.Powder() {
		text = p.Added.Written()
	}
	v, err := parse(text)
	return amount, v.value, err
}

// holds reports that a document's strength and volume are this container's.
func holds(p formulary.Presentation, powder bool, amount figure, volume string) bool {
	have, v, err := contents(p)
	if err != nil || powder != p.Powder() || have.kind != amount.kind {
		return false
	}
	if !powder {
		have.value = new(big.Rat).Quo(have.value, v)
	}
	return have.value.Cmp(amount.value) == 0 && (volume == "" || v.Cmp(rat(volume)) == 0)
}

// unseen finds containers that no document of the tables states. They may be
// shipped because people have them in the hand, but marked unverified.
func (t *Tables) unseen(d formulary.Drug) []Finding {
	var out []Finding
	for _, p := range d.Presentations {
		stated := slices.ContainsFunc(t.strengths, func(s strength) bool {
			return s.drug == d.Name && holds(p, s.powder, s.amount, s.volume)
		})
		if !stated {
			out = append(out, Finding{"unseen", d.Name + ", " + p.ID, "no document of the table of strengths states it"})
		}
		if !stated && !p.Unverified {
			out = append(out, Finding{"unmarked", d.Name + ", " + p.ID, "no document states it, and it is not marked unverified"})
		}
	}
	return out
}

// missing finds containers of the published rows that the record does not file.
func (t *Tables) missing(d formulary.Drug) []Finding {
	var out []Finding
	for _, r := range t.rows[d.Name] {
		if r.prepared || !r.strength.given() {
			continue
		}
		if !slices.ContainsFunc(d.Presentations, func(p formulary.Presentation) bool { return r.is(p) }) {
			out = append(out, Finding{"not shipped", strings.TrimSuffix(d.Name+", "+r.container(), ", "), "sources " + r.sources})
		}
	}
	return out
}
