package verify_test

import (
	"fmt"
	"math/big"
	"regexp"
	"slices"
	"strings"
	"testing"

	"github.com/pelletier/go-toml/v2"

	"drawup/dilution/formulary"
	"drawup/dilution/formulary/published"
	"drawup/dilution/formulary/verify"
)

// everyMutant is how many mutants there are to one that go test works; .ci/run
// works them all.
const everyMutant = 7

// Every limit, strength, factor, displacement, time and maximum of the starter,
// multiplied and divided by ten and by a thousand, one at a time: the reader,
// verify and the published tables together must see more than nine in ten, and of
// the thousandfold slips nearly all.
func TestMutants(t *testing.T) { mutate(t, everyMutant) }

// A score counts the mutants of one kind, and who saw them.
type score struct{ all, byVerify, byTables, either int }

func (s *score) add(byVerify, byTables bool) {
	s.all++
	for _, x := range []struct {
		count *int
		saw   bool
	}{{&s.byVerify, byVerify}, {&s.byTables, byTables}, {&s.either, byVerify || byTables}} {
		if x.saw {
			*x.count++
		}
	}
}

func (s *score) String() string {
	return fmt.Sprintf("%5d mutants: verify sees %5.1f %%, the tables %5.1f %%, either %5.1f %%",
		s.all, percent(s.byVerify, s.all), percent(s.byTables, s.all), percent(s.either, s.all))
}

func percent(n, of int) float64 { return 100 * float64(n) / float64(of) }

func mutate(t *testing.T, step int) {
	tables, err := published.Load("../../../testdata/formulary")
	if err != nil {
		t.Fatal(err)
	}
	byKey, byFactor, total := map[string]*score{}, map[string]*score{}, &score{}
	n := 0
	for _, one := range blocks(t) {
		if seen := one.seen(t, one.text, tables); seen != (sight{}) {
			t.Fatalf("%s: the block itself is found fault with: %+v", one.drug, seen)
		}
		for _, m := range one.mutants(t) {
			n++
			if n%step != 0 {
				continue
			}
			s := one.seen(t, m.text, tables)
			for _, x := range []*score{at(byKey, m.key), at(byFactor, m.factor), total} {
				x.add(s.byVerify, s.byTables)
			}
			if testing.Verbose() && !s.byVerify && !s.byTables && step == 1 {
				t.Logf("unseen: %s: %s: %s %s", one.drug, m.key, m.was, m.factor)
			}
		}
	}
	report(t, byKey)
	report(t, byFactor)
	t.Logf("in all %v", total)
	if got := percent(total.either, total.all); got <= 90 {
		t.Errorf("got %.1f %% of the mutants seen, want more than 90 %%", got)
	}
	for _, f := range []string{"× 1000", "÷ 1000"} {
		if got := percent(byFactor[f].either, byFactor[f].all); got < 97 {
			t.Errorf("got %.1f %% of %s seen, want 97 %% or more", got, f)
		}
	}
}

func at(scores map[string]*score, key string) *score {
	if scores[key] == nil {
		scores[key] = &score{}
	}
	return scores[key]
}

func report(t *testing.T, scores map[string]*score) {
	var keys []string
	for k := range scores {
		keys = append(keys, k)
	}
	slices.Sort(keys)
	for _, k := range keys {
		t.Logf("%-14s %v", k, scores[k])
	}
}

// A block is the text of one drug, with its sources before it, as a formulary of
// its own.
type block struct {
	drug string
	head string
	text string
}

// A sight says who found fault with a text.
type sight struct{ byVerify, byTables bool }

func (b block) seen(t *testing.T, text string, tables *published.Tables) sight {
	t.Helper()
	f, faults := formulary.Read(formulary.Text{Name: b.drug + ".toml", Data: []byte(b.head + text)})
	if faults.Refused() {
		return sight{byVerify: true}
	}
	s := sight{byVerify: len(verify.Check(f)) > 0}
	for _, d := range f.Drugs() {
		s.byTables = s.byTables || len(tables.Check(d)) > 0
	}
	return s
}

// top parts a starter file at its tables of the first level.
var top = regexp.MustCompile(`(?m)^\[\[?(drug|mix|never_mix|tall_man|sources)\b`)

// blocks cuts the starter into its drugs.
func blocks(t *testing.T) []block {
	t.Helper()
	texts, err := formulary.DefaultTexts()
	if err != nil {
		t.Fatal(err)
	}
	var out []block
	for _, x := range texts {
		var file struct {
			Sources map[string]map[string]string `toml:"sources"`
		}
		if err := toml.Unmarshal(x.Data, &file); err != nil {
			t.Fatalf("%s: %v", x.Name, err)
		}
		places := top.FindAllIndex(x.Data, -1)
		for i, p := range places {
			end := len(x.Data)
			if i+1 < len(places) {
				end = places[i+1][0]
			}
			if text := string(x.Data[p[0]:end]); strings.HasPrefix(text, "[[drug]]") {
				out = append(out, newBlock(text, file.Sources))
			}
		}
	}
	return out
}

// The keys of a block that name a source, the line of its name, and the list of
// other drugs, which are not in the text.
var (
	sourceKey   = regexp.MustCompile(`\b(?:by_)?source = "([^"]+)"`)
	nameLine    = regexp.MustCompile(`(?m)^name = "([^"]+)"`)
	substitutes = regexp.MustCompile(`(?m)^substitutes = .*\n`)
)

func newBlock(text string, sources map[string]map[string]string) block {
	text = substitutes.ReplaceAllString(text, "")
	b := block{drug: nameLine.FindStringSubmatch(text)[1], text: text, head: "name = \"one drug\"\nversion = \"1\"\n"}
	used := map[string]bool{}
	for _, m := range sourceKey.FindAllStringSubmatch(text, -1) {
		if s := sources[m[1]]; !used[m[1]] {
			b.head += fmt.Sprintf("[sources.%q]\ntitle = %q\ngrade = %q\njurisdiction = %q\n", m[1], s["title"], s["grade"], s["jurisdiction"])
			used[m[1]] = true
		}
	}
	return b
}

// A mutant is a block with one figure changed.
type mutant struct{ key, factor, was, text string }

// figures finds the figures of a block: "high = { value = \"320 microgram/mL\"",
// "amount = \"20 mg\"". Ages, numbers in names and in sentences are none.
var figures = regexp.MustCompile(`\b(\w+) = (?:\{ )?(?:value = )?"([0-9.]+)( [^"]+)"`)

// keys are the figures that change: those of limits, and those by name.
var named = []string{"amount", "second_amount", "volume", "add", "displacement", "overfill", "assay", "substance", "per_mg", "mix", "hours",
	"low", "high", "hard_low", "usual_low", "usual_high", "soft_high", "hard_high", "total_max", "first_max", "repeat_max", "repeat_after",
	"day_max", "course_max", "longest", "per_kg", "total"}

var factors = []struct {
	name string
	by   *big.Rat
}{{"× 10", big.NewRat(10, 1)}, {"÷ 10", big.NewRat(1, 10)}, {"× 1000", big.NewRat(1000, 1)}, {"÷ 1000", big.NewRat(1, 1000)}}

func (b block) mutants(t *testing.T) []mutant {
	t.Helper()
	var out []mutant
	for _, m := range figures.FindAllStringSubmatchIndex(b.text, -1) {
		key, number, unit := b.text[m[2]:m[3]], b.text[m[4]:m[5]], b.text[m[6]:m[7]]
		if !slices.Contains(named, key) {
			continue
		}
		for _, f := range factors {
			x, ok := new(big.Rat).SetString(number)
			if !ok {
				t.Fatalf("%s: %s: %q is no number", b.drug, key, number)
			}
			text := strings.TrimRight(strings.TrimRight(x.Mul(x, f.by).FloatString(12), "0"), ".")
			out = append(out, mutant{key, f.name, number + unit, b.text[:m[4]] + text + b.text[m[5]:]})
			if id := b.identifier(m[0], number+unit); id >= 0 && (key == "amount" || key == "mix") {
				out = append(out, mutant{key + " with id", f.name, number + unit,
					b.text[:id] + text + b.text[id+len(number):m[4]] + text + b.text[m[5]:]})
			}
		}
	}
	return out
}

// identifier is where the id of the record around a place begins to say the same
// figure, -1 when it does not: whoever slips may slip in both.
func (b block) identifier(at int, figure string) int {
	from := strings.LastIndex(b.text[:at], "\n  id = ")
	if from < 0 {
		return -1
	}
	line, _, _ := strings.Cut(b.text[from+1:], "\n")
	if i := strings.Index(line, figure); i >= 0 {
		return from + 1 + i
	}
	return -1
}
