package quantity

import (
	"regexp"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// A lint is one expression for a way of writing doses that is forbidden, with
// texts that it must and must not match. The rules and the examples are those
// of the ISMP lists of error-prone abbreviations and dose designations, the
// Joint Commission "Do Not Use" list, the British National Formulary on
// prescription writing, the US pharmacopoeia, general chapter 7 (ratios), and
// the SI Brochure 5.3.3; N10 and N15 are common practice beside them.
type lint struct {
	id, expression string
	bad, good      []string
}

const unitsInLint = `(?:mg|g|kg|mcg|ng|micrograms?|nanograms?|milligrams?|grams?|mL|ml|L|units?|mmol|mEq|%)`

func lints() []lint {
	return []lint{
		{"N01 trailing zero", `\d+\.\d*0\s*` + unitsInLint, []string{"1.0 mg", "2.50 mL", "0.10 mg"}, []string{"10 mg", "1,000 units", "1.05 mg"}},
		{"N02 naked point", `(?:^|[^0-9])\.\d`, []string{".5 mg"}, []string{"0.5 mg"}},
		{"N03 no blank", `\d(?:mg|g|kg|mcg|ng|micrograms?|nanograms?|mL|ml|L|units?|mmol|mEq)\b`, []string{"10mg"}, []string{"10 mg"}},
		{"N05 U, IU", `\d\s*(?:I\.?U\.?|i\.?u\.?|U|u|UI|IE)(?:$|[^A-Za-z])`, []string{"50 U", "100 IU/mL"}, []string{"50 units"}},
		{"N06 Greek letter", `[\x{00B5}\x{03BC}]g|\bug\b|\bgamma\b|\d\s*mcgs\b`, []string{"50 \u00b5g", "50 \u03bcg", "50 ug"}, []string{"50 mcg"}},
		{"N06b ng", `\b(?:ng|nanog)\b`, []string{"10 ng/kg/min"}, []string{"10 nanograms/kg/min"}},
		{"N07 ml, cc", `\b(?:ml|ML|cc|ccm|cm3)\b`, []string{"5 ml", "5 cc"}, []string{"5 mL"}},
		{"N08 ratio", `\b1\s*(?::|in)\s*\d{1,3}(?:[ ,\x{00A0}\x{2009}\x{202F}]?\d{3})+\b`, []string{"1:1000", "1 in 10,000", "1 : 200 000"}, []string{"1 in 5 mL", "1:1"}},
		{"N09 no groups", `\d{5,}`, []string{"10000 units"}, []string{"10,000 units", "10 000 units"}},
		{"N09 no groups from 1,000", `(?:^|[^\d.])\d{4,}`, []string{"5000 units"}, []string{"5,000 units", "0.0405 mg"}},
		{"N10 full stop", `\b(?:mg|g|mcg|mL|L|mmol)\.(?:\s|$)`, []string{"10 mg. in"}, []string{"10 mg in"}},
		{"N11 plural of a symbol", `\b(?:mgs|mLs|mls|gms?|mcgs|kgs|mmols|hrs?)\b`, []string{"5 mLs", "mL/hr"}, []string{"mL/h"}},
		{"N12 short drug names", `\b(?:EPI|NOREPI|NEO|SUX|ROC|VEC|VASO|KCl|KCL|MgSO4|MSO4|MS|NTG|GTN|SNP|TXA|PHE|NaHCO3|CaCl2?)\b`, []string{"KCl 20 mmol"}, []string{"potassium chloride"}},
		{"N13 per cent alone", `^[^/]*\d\s*%`, []string{"0.5%"}, []string{"5 mg/mL (0.5 %)"}},
		{"N15 thousand, million", `\d\s*(?:k|K|M|MM|mil)\b`, []string{"5 K units"}, []string{"5 million units", "5 kg"}},
	}
}

func TestLintExpressions(t *testing.T) {
	for _, l := range lints() {
		re := regexp.MustCompile(l.expression)
		for _, text := range l.bad {
			if !re.MatchString(text) {
				t.Errorf("%s: lets %q pass", l.id, text)
			}
		}
		for _, text := range l.good {
			if re.MatchString(text) {
				t.Errorf("%s: stops %q", l.id, text)
			}
		}
	}
}

// printed draws one random quantity of every sort and prints it in style s.
// Percent is left out: it is the width of an interval, not a strength, and the
// only print that carries a per cent sign.
func printed(t *rapid.T, s Style) []string {
	n, u := aRat().Draw(t, "n"), aUnit().Draw(t, "unit")
	b := rapid.SampledFrom([]Basis{Absolute, PerKilogram, PerSquareMetre}).Draw(t, "basis")
	p := rapid.SampledFrom([]Period{PerMinute, PerHour, PerDay}).Draw(t, "period")
	a := AmountOf(n, u)
	out := []string{
		s.Amount(a), s.Volume(Millilitres(n)), s.FlowRate(MillilitresPerHour(n)), s.Dose(doseOf(n, u, b)),
		s.DoseRate(doseRateOf(n, u, b, p)), s.BodyWeight(Kilograms(n)), s.Surface(SquareMetres(n)), s.Length(Centimetres(n)),
		s.Duration(Minutes(n)), s.DropRate(DropsPerMinute(n)), s.DropFactor(DropFactor{x: fromRat(n)}),
	}
	c, err := a.In(Millilitres(aRat().Draw(t, "volume")))
	if err != nil {
		t.Fatalf("%v", err)
	}
	out = append(out, s.Concentration(c))
	for _, unit := range allUnits() {
		if unit.Kind() == a.Kind() {
			out = append(out, s.AmountIn(a, unit), s.ConcentrationIn(c, unit))
		}
	}
	return out
}

// TestNothingForbiddenIsPrinted: no print matches a forbidden expression, and
// each is one number, one blank, one unit; a span of time may be two of them. N09 is about digits in front of the
// point; decimals are never grouped and are cut off for it.
func TestNothingForbiddenIsPrinted(t *testing.T) {
	var forbidden []*regexp.Regexp
	for _, l := range lints() {
		forbidden = append(forbidden, regexp.MustCompile(l.expression))
	}
	shape := regexp.MustCompile("^(?:0|[1-9][0-9]{0,2}(?:[,\u00a0][0-9]{3})*)(?:\\.[0-9]*[1-9])? " +
		"(?:g|mg|mcg|micrograms?|nanograms?|units?|milliunits?|mmol|micromol|mL|kg|cm|m²|drops?|h|min|s)(?:/kg|/m²)?(?:/mL|/h|/min|/day)?(?: [0-9]{1,2} (?:min|s))?$")
	decimals := regexp.MustCompile(`\.\d+`)
	rapid.Check(t, func(t *rapid.T) {
		s := rapid.SampledFrom(styles()).Draw(t, "style")
		for _, text := range printed(t, s) {
			for i, re := range forbidden {
				seen := text
				if strings.HasPrefix(lints()[i].id, "N09 ") {
					seen = decimals.ReplaceAllString(text, "")
				}
				if re.MatchString(seen) {
					t.Fatalf("%v prints %q, which breaks %s", s, text, lints()[i].id)
				}
			}
			if !shape.MatchString(text) {
				t.Fatalf("%v prints %q, which is no number with a unit", s, text)
			}
		}
	})
}

// TestStyleWords: uk and si never write mcg, us never microgram; si never
// groups by comma, the others only by it.
func TestStyleWords(t *testing.T) {
	never := map[string]*regexp.Regexp{
		"uk": regexp.MustCompile("mcg|\u00a0"), "us": regexp.MustCompile("microgram|\u00a0"), "si": regexp.MustCompile("mcg|,"),
	}
	rapid.Check(t, func(t *rapid.T) {
		s := rapid.SampledFrom(styles()).Draw(t, "style")
		for _, text := range printed(t, s) {
			if never[s.String()].MatchString(text) {
				t.Fatalf("%v prints %q", s, text)
			}
		}
	})
}
