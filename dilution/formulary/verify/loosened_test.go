package verify_test

import (
	"fmt"
	"slices"
	"strings"
	"testing"

	"drawup/dilution/formulary"
	"drawup/dilution/refusal"
)

// everyLoosened is how many of the slips and lines below there are to one that
// go test works; .ci/run works them all.
const everyLoosened = 11

// A site's file with one drug of the starter and one figure of it ten times
// looser is refused, and passes once what the refusal asks for is there: a reason
// beside the figure, or a record of what was taken away.
func TestSitesLoosen(t *testing.T) { loosen(t, everyLoosened) }

// A line that is gone from the block of a drug is refused or told.
func TestLinesGone(t *testing.T) { strike(t, everyLoosened) }

// looser is the factor by which a figure lets more through.
var looser = map[string]string{"low": "÷ 10", "hard_low": "÷ 10", "usual_low": "÷ 10", "repeat_after": "÷ 10",
	"high": "× 10", "usual_high": "× 10", "soft_high": "× 10", "hard_high": "× 10", "total_max": "× 10", "first_max": "× 10",
	"repeat_max": "× 10", "day_max": "× 10", "course_max": "× 10", "longest": "× 10", "per_kg": "× 10", "total": "× 10", "hours": "× 10"}

const siteHead = "name = \"harbour\"\nversion = \"7\"\nbase = \"one drug 1\"\n"

// over lays a text over the block it was made from, as a site's file.
func (b block) over(t *testing.T, base *formulary.Formulary, text string) refusal.List {
	t.Helper()
	_, faults := formulary.Layer(base, formulary.Text{Name: "site.toml", Data: []byte(siteHead + b.sources() + text)})
	return faults
}

// sources is the head without the name and the version.
func (b block) sources() string {
	_, s, _ := strings.Cut(b.head, "version = \"1\"\n")
	return s
}

func (b block) read(t *testing.T) *formulary.Formulary {
	t.Helper()
	f, faults := formulary.Read(formulary.Text{Name: "base.toml", Data: []byte(b.head + b.text)})
	if faults.Refused() {
		t.Fatal(faults)
	}
	return f
}

func loosen(t *testing.T, step int) {
	n, refused, reasoned := 0, 0, 0
	for _, b := range blocks(t) {
		base := b.read(t)
		for _, m := range b.mutants(t) {
			if looser[m.key] != m.factor {
				continue
			}
			if n++; n%step != 0 {
				continue
			}
			faults := b.over(t, base, m.text)
			if !slices.Contains(faults.Codes(), refusal.LimitLoosened) {
				if len(faults) == 0 {
					t.Errorf("%s: %s: %s %s is loosened without a word", b.drug, m.key, m.was, m.factor)
				}
				continue // the reader refuses the figure itself
			}
			refused++
			if again := b.over(t, base, b.explained(m.text, faults)); slices.Contains(again.Codes(), refusal.LimitLoosened) {
				t.Errorf("%s: %s: %s %s with the records asked for: %v", b.drug, m.key, m.was, m.factor, again)
			}
			text, ok := withReason(b.text, m.text)
			if !ok {
				continue
			}
			reasoned++
			if again := b.over(t, base, text); slices.Contains(again.Codes(), refusal.LimitLoosened) {
				t.Errorf("%s: %s: %s %s with a reason: %v", b.drug, m.key, m.was, m.factor, again)
			}
		}
	}
	t.Logf("%d slips, %d refused as loosened, %d of them tried with a reason", n/step, refused, reasoned)
	if refused < n/step/2 || reasoned < refused/2 {
		t.Error("too few to mean something")
	}
}

// explained adds the records that the refusals ask for.
func (b block) explained(text string, faults refusal.List) string {
	source := sourceKey.FindStringSubmatch(text)[1]
	for _, x := range faults {
		if x.Code == refusal.LimitLoosened {
			text += fmt.Sprintf("\n[[drug.taken_away]]\nlimit = %q\nreason = \"an invented reason\"\nsource = %q\n", x.Field, source)
		}
	}
	return text
}

// withReason puts a reason beside the figure that differs, where it stands in a
// table of its own. The concentrations that a time in use holds for are part of
// what it is called: another is another time, and takes a record.
func withReason(was, is string) (string, bool) {
	at := 0
	for at < len(was) && at < len(is) && was[at] == is[at] {
		at++
	}
	if strings.LastIndex(is[:at], "[[drug.stability]]") > max(strings.LastIndex(is[:at], "[[drug.concentration]]"), strings.LastIndex(is[:at], "[[drug.presentation]]")) {
		return "", false
	}
	end := at + strings.Index(is[at:], "\"") + 1
	if !strings.HasPrefix(is[end:], ", source") {
		return "", false
	}
	return is[:end] + ", reason = \"an invented reason\"" + is[end:], true
}

// silent are lines that say what holds without them.
var silent = []string{"flags = []", "neat = false", "with_adrenaline = false", "ions_per_formula = 1", "unverified = true"}

func strike(t *testing.T, step int) {
	n, refused := 0, 0
	for _, b := range blocks(t) {
		base := b.read(t)
		lines := strings.SplitAfter(b.text, "\n")
		for i, l := range lines {
			key := strings.TrimSpace(l)
			// A name may stand twice: as the drug's own and in a list.
			if key == "" || key[0] == '#' || strings.HasPrefix(key, "also = ") || strings.HasPrefix(key, "names = ") {
				continue
			}
			if n++; n%step != 0 {
				continue
			}
			f, faults := formulary.Read(formulary.Text{Name: "site.toml", Data: []byte(b.head + strings.Join(slices.Delete(slices.Clone(lines), i, i+1), ""))})
			if faults.Refused() {
				refused++
				continue
			}
			if len(formulary.Compare(base, f)) == 0 && !(slices.Contains(silent, key) && b.saysNothing(key)) {
				t.Errorf("%s: the line %q can go without a word", b.drug, key)
			}
		}
	}
	t.Logf("%d lines gone, %d refused by the reader", n/step, refused)
}

// saysNothing reports that a line is silent here: what rests on a weak source is
// unverified without being marked.
func (b block) saysNothing(key string) bool {
	return key != "unverified = true" || strings.Contains(b.head, "grade = \"C\"")
}
