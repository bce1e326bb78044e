package sheets_test

import (
	"regexp"
	"slices"
	"strings"
	"testing"

	"drawup/dilution"
	"drawup/dilution/recheck"
	"drawup/labels"
	"drawup/labels/sheets"
)

// session and site are the head of an invented order.
const session = `
[session]
place = "Harbour Theatre 2 (invented)"
date = 2026-12-01
prepared = "07:30"
zone = "+00:00"
preparer = "A. Sample"
invented = true
[site]
bolus_use_by = "12 h"
infusion_use_by = "24 h"

[[patient]]
id = "HM-01"
sex = "female"
age = "38 years"
height = "168 cm"
weight = "70 kg"
`

// little is a syringe whose reading, not its assay, is most of the interval:
// by ISO 7886-1, table 1, 0.1 mL in a barrel of 1 mL may be 0.015 mL + 2 % of
// 0.1 mL off, that is 17 %, against the 10 % of the assay.
const little = session + `
  [[patient.syringe]]
  drug = "ephedrine"
  presentation = "ampoule 30 mg in 1 mL"
  concentration = "3 mg/mL"
  volume = "1 mL"
`

// Rule R9: the interval comes from the assay and the readings. Whichever is
// largest, the assay is printed, so that the interval can be worked again.
func TestAssayAlwaysStandsBesideTheInterval(t *testing.T) {
	for _, text := range []string{little, demo, others(t)} {
		r := papers(t, text, 0)
		for i, p := range r.list.Plans {
			working := strings.Join(r.check[2*i+1].Text(), "\n")
			inOrder(t, working, "interval: plus or minus", "assay limits plus or minus "+r.facts[i].Text(recheck.Assay), "most of it from")
			if _, err := recheck.Check(labels.Stated(p, r.figures(p.Number))); err != nil {
				t.Errorf("syringe %d, %s: %v", p.Number, p.Drug.Name, err)
			}
		}
	}
	working := strings.Join(papers(t, little, 0).check[1].Text(), "\n")
	inOrder(t, working, "most of it from reading 0.1 mL on the 1 mL barrel")
}

// graded is what stands behind the title of a source.
var graded = regexp.MustCompile(` \(grade [^)]*\)$`)

// unexcused are the cells of a plan's sheets that hold the word and are no
// sentence and no title of the formulary.
func unexcused(r run, p dilution.Plan, word string) []string {
	record := strings.Join(strings.Fields(string(p.Drug.Raw)), " ")
	var out []string
	for _, s := range r.all() {
		for _, part := range s.Parts {
			for _, b := range part.Blocks {
				for _, o := range b.Lines() {
					if max(o.Syringe, part.Syringe) != p.Number {
						continue
					}
					for _, c := range o.Line {
						text := strings.TrimSuffix(graded.ReplaceAllString(strings.Join(strings.Fields(c.Text), " "), ""), ".")
						words := c.Figure == "" || strings.HasPrefix(c.Figure, recheck.Said+".")
						if strings.Contains(text, word) && !(words && strings.Contains(record, text)) {
							out = append(out, s.Paper+": "+c.Text)
						}
					}
				}
			}
		}
	}
	return out
}

// The house style "us" writes mcg. What the formulary says word for word (the
// name of a container, a note) keeps the formulary's words; nothing else does.
func TestStyleUSNeverSpellsMicrogram(t *testing.T) {
	mcg, bounds := 0, 0
	for _, text := range []string{demo, others(t)} {
		text = strings.Replace(strings.ReplaceAll(text, " microgram/", " mcg/"), "[site]\n", "[site]\nstyle = \"us\"\n", 1)
		r := papers(t, strings.ReplaceAll(text, "10 microgram/min", "10 mcg/min"), 0)
		for _, p := range r.list.Plans {
			for _, got := range unexcused(r, p, "microgram") {
				t.Errorf("syringe %d, %s, want mcg", p.Number, got)
			}
			for _, f := range r.figures(p.Number) {
				if strings.Contains(f.Text, "mcg") {
					mcg++
					if strings.HasPrefix(f.Name, recheck.Bound+".") {
						bounds++
					}
				}
			}
			if _, err := recheck.Check(labels.Stated(p, r.figures(p.Number))); err != nil {
				t.Errorf("syringe %d: %v", p.Number, err)
			}
		}
	}
	if mcg < 50 || bounds < 10 {
		t.Errorf("got %d figures in mcg, %d of them limits, want at least 50 and 10", mcg, bounds)
	}
}

// Rule R14: from 1,000 on the
// digits of a limit are grouped, by a comma or by a thin blank in style "si".
func TestLimitsAreGrouped(t *testing.T) {
	const heparin = session + `
  [[patient.syringe]]
  drug = "heparin"
  presentation = "ampoule 5000 units in 5 mL"
  dose = "5000 units"
`
	ungrouped := regexp.MustCompile(`[0-9]{4}`)
	for style, want := range map[string]string{"uk": "5,000 units", "us": "5,000 units", "si": "5\u202f000 units"} {
		r := papers(t, strings.Replace(heparin, "[site]\n", "[site]\nstyle = \""+style+"\"\n", 1), 0)
		var limits []string
		for _, f := range r.figures(1) {
			if strings.HasPrefix(f.Name, recheck.Bound+".") {
				limits = append(limits, f.Text)
				if ungrouped.MatchString(f.Text) {
					t.Errorf("style %s: got limit %q, want its thousands grouped", style, f.Text)
				}
			}
		}
		if !slices.ContainsFunc(limits, func(s string) bool { return strings.Contains(strings.ReplaceAll(s, "\u00a0", "\u202f"), want) }) {
			t.Errorf("style %s: got limits %q, want one of %q", style, limits, want)
		}
		figures := r.figures(1)
		stated := labels.Stated(r.list.Plans[0], figures)
		for _, f := range figures { // as the command states them: each limit as it was given
			if strings.HasPrefix(f.Name, recheck.Bound+".") {
				stated.Asked = append(stated.Asked, f)
			}
		}
		if _, err := recheck.Check(stated); err != nil {
			t.Errorf("style %s: %v", style, err)
		}
	}
}

// The preparer needs the volume to draw first: it stands in the head of the
// syringe with what becomes of it (rule R5), before the concentration.
func TestHeadSaysWhatToDraw(t *testing.T) {
	heads := map[string]sheets.Name{}
	for _, text := range []string{demo, others(t)} {
		for _, part := range papers(t, text, leftOut).drawUp[0].Parts {
			for _, b := range part.Blocks {
				if name, ok := b.(sheets.Name); ok {
					heads[name.Drug+", "+name.Concentration.Text()] = name
				}
			}
		}
	}
	for head, want := range map[string][2]string{
		"Ephedrine, 3 mg/mL":                       {"draw 2 mL", "make up to 20 mL"}, // 20 mL of 3 mg/mL are 60 mg, two ampoules of 30 mg in 1 mL
		"Remifentanil, 50 micrograms/mL":           {"add 2 mL, draw 2 mL", "make up to 40 mL"},
		"Noradrenaline (base), 74.1 micrograms/mL": {"draw 8 mL", "add to the full bag: 108 mL in all"}, // 8 mg in 108 mL
		"Oxytocin, 0.01 unit/mL":                   {"draw 1 mL", "first withdraw as much from the bag; 500 mL in all"},
	} {
		name, ok := heads[head]
		if !ok {
			t.Errorf("got no head %q, want it", head)
			continue
		}
		if name.Act.Text() != want[0] || name.Then.Text() != want[1] {
			t.Errorf("%s: got %q, %q, want %q, %q", head, name.Act.Text(), name.Then.Text(), want[0], want[1])
		}
	}
}

// A paper of a bag is headed so.
func TestPapersOfABagSayBag(t *testing.T) {
	r := papers(t, others(t), 0)
	want := map[int]string{1: "syringe 1", 2: "bag 2", 3: "bag 3", 4: "syringe 4", 5: "syringe 5", 6: "syringe 6"}
	for _, s := range slices.Concat(r.pump, r.check) {
		if strings.HasPrefix(s.Note, "open only") {
			continue
		}
		if s.Note != want[s.Syringe] {
			t.Errorf("%s of %d: got %q, want %q", s.Paper, s.Syringe, s.Note, want[s.Syringe])
		}
	}
	for i, p := range r.list.Plans {
		text := strings.Join(r.check[2*i].Text(), "\n")
		if got := strings.Contains(text, "on the right bag"); got != p.Mixture.InBag {
			t.Errorf("syringe %d: got the words on the bag %v, want %v", p.Number, got, p.Mixture.InBag)
		}
	}
}
