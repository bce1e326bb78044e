package lint

import (
	"math/big"
	"regexp"
	"strings"
)

// strengthRules are about strengths, and about what a whole label has to say of
// them.
func strengthRules() []Rule {
	return []Rule{
		{Code: "N08", Fault: "a ratio for the strength of one drug",
			Says:   "no ratio strength for one drug: mg/mL or micrograms/mL",
			Source: errorProne + "; " + usp7 + "; " + reportedFDA, Severity: Stop, Scope: EveryText,
			Wrong: []string{"adrenaline 1:1000", "adrenaline 1 in 10,000", "1 : 200 000", "1:10000"}, Right: []string{"1 in 5 mL", "1:1", "ISO 7886-1:1993", "lidocaine with adrenaline 5 micrograms/mL (1 in 200,000)"},
			find: ratios(false)},
		{Code: "N08b", Fault: "a ratio without micrograms/mL before it",
			Says:   "a local anaesthetic with adrenaline may keep the ratio, in brackets behind micrograms/mL",
			Source: errorProne + "; " + usp7, Severity: Warn, Scope: EveryText,
			Wrong: []string{"lidocaine with adrenaline 1 in 200 000"}, Right: []string{"lidocaine with adrenaline 5 micrograms/mL (1 in 200,000)"},
			find: ratios(true)},
		{Code: "N13", Fault: "a strength in per cent alone",
			Says:   "per cent never alone: mg/mL first, per cent in brackets at most; the name of a diluent keeps its own",
			Source: ourOwn + "; ASTM D4774 shows both", Severity: Stop, Scope: EveryText,
			Wrong: []string{"lidocaine 2 %", "0.5%", "bupivacaine 0.5 % heavy", "sodium bicarbonate 8.4 %"},
			Right: []string{"lidocaine 20 mg/mL (2 %)", "in glucose 5 %", "sodium chloride 0.9 %", "plus or minus 10 %", "5.3 mL/h, +0.952 %", "0 %", "1.12 % more", "within 5 % of it"},
			find:  percents},
		{Code: "N19", Fault: "an amount in a volume without the concentration for each mL",
			Says:   "the concentration for each mL comes first; amount in volume second",
			Source: asa + "; " + divi, Severity: Stop, Scope: WholeLabel,
			Wrong: []string{"fentanyl|500 micrograms/10 mL", "propofol|200 mg in 20 mL"}, Right: []string{"propofol|10 mg/mL|200 mg in 20 mL", "water|10 mL"},
			look: perMillilitre},
		{Code: "N22", Fault: "a dose rate in another unit of mass than the concentration",
			Says:   "one unit of mass on label and pump, or both with the sum between them",
			Source: ourOwn, Severity: Warn, Scope: WholeLabel,
			Wrong: []string{"dopamine|4 mg/mL|5 micrograms/kg/min"}, Right: []string{"dopamine|4 mg/mL = 4,000 micrograms/mL|5 micrograms/kg/min", "propofol|10 mg/mL|4 mg/kg/h"},
			look: oneUnit},
		{Code: "N23", Fault: "a mass that may be of the base or of the salt",
			Says:   "what the mass means where salt and base differ: noradrenaline base or tartrate",
			Source: unseen + "; " + "regulator of Australia, labels of noradrenaline", Severity: Stop, Scope: WholeLabel,
			Wrong: []string{"noradrenaline|80 micrograms/mL"}, Right: []string{"noradrenaline|80 micrograms/mL base", "adrenaline|80 micrograms/mL"},
			look: baseOrSalt},
		{Code: "N24", Fault: "an electrolyte by mass without mmol",
			Says:   "electrolytes as mmol beside their mass",
			Source: unseen, Severity: Warn, Scope: WholeLabel,
			Wrong: []string{"magnesium sulfate|200 mg/mL|2 g in 10 mL"}, Right: []string{"magnesium sulfate|200 mg/mL|2 g in 10 mL|8 mmol in 10 mL", "potassium chloride|2 mmol/mL"},
			look: asMillimoles},
	}
}

var ratio = regexp.MustCompile(`\b1\s*(?:(?::|in)\s*(\d{1,3}(?:[ ,\x{00A0}\x{2009}\x{202F}]?\d{3})+)|:\s*(\d{3}))\b`)

// behind is what has to stand before a ratio of a mixture.
var behind = regexp.MustCompile(`\d` + gap + `(?:micrograms?|mcg)/mL \($`)

// counted are the words after a ratio that counts people and no strength.
var counted = regexp.MustCompile(`^ (?:patients|people|persons|cases|women|men|children|births|doses|anaesthetics)\b`)

// ratios finds ratio strengths: of one drug, or of a local anaesthetic with
// adrenaline.
func ratios(mixture bool) func(House, string) []match {
	return func(h House, text string) []match {
		if !strings.Contains(text, "1") {
			return nil
		}
		low := strings.ToLower(text)
		local := strings.Contains(low, "caine") && (strings.Contains(low, "adrenaline") || strings.Contains(low, "epinephrine"))
		var out []match
		for _, at := range ratio.FindAllStringSubmatchIndex(text, -1) {
			if counted.MatchString(text[at[1]:]) || local != mixture || at[0] > 0 && text[at[0]-1] == '-' || local && behind.MatchString(text[:at[0]]) {
				continue
			}
			out = append(out, match{from: at[0], to: at[1], fix: perMl(h, strings.TrimLeft(text[at[0]+1:at[1]], " :in"))})
		}
		return out
	}
}

// perMl is 1 in n by mass: 1000/n mg/mL (US Pharmacopeia, general chapter 7).
func perMl(h House, n string) string {
	d, ok := new(big.Int).SetString(digits(n), 10)
	if !ok || d.Sign() == 0 {
		return ""
	}
	r := new(big.Rat).SetFrac(big.NewInt(1000), d)
	unit := "mg"
	if r.Cmp(big.NewRat(1, 1)) < 0 {
		r.Mul(r, big.NewRat(1000, 1))
		unit = "microgram"
	}
	if !new(big.Rat).Mul(r, big.NewRat(1000, 1)).IsInt() {
		return ""
	}
	text := trimmedDecimal(r)
	if unit == "microgram" {
		unit = h.microgram(text)
	}
	return text + " " + unit + "/mL"
}

var percent = regexp.MustCompile(`\d` + gap + `%`)

// Words that make a per cent something else than a drug's strength: before it
// the name of a diluent or a word of comparison, after it what it is a part of.
var (
	notStrength = regexp.MustCompile(`(?i)(?:(?:glucose|dextrose|sodium chloride|saline|albumin|mannitol|isopropanol|ethanol|alcohol|glycerol|propylene glycol|chlorobutanol|emulsion)(?: solution)?|` +
		`minus|±|within|by|about|around|than|to|of|under|below|above|over|least|most|nearest|is|are|was|were|and|or|from|lies|loses|lost|lose|keeps|kept|remains|only|some|nearly|almost|up|` +
		`reading|assay|tolerance|rounding|interval|between|in|a|an|the|further|at|for|BMI|=|~|≤|≥|<|>|\()[ :]*(?:\d[\d.,]*(?: to | or | and |-|–)?)*$`)
	partOf = regexp.MustCompile(`^(?:,? (?:of|more|less|off|lower|higher|above|below|beyond|under|over|either|each|loss|lost|oxygen|benzyl alcohol|propylene glycol|alcohol|ethanol|lies|and|or|to|is assumed)\b|[-–]\d)`)
	inMass = regexp.MustCompile(`\d` + gap + `(?:mg|micrograms?|mcg|g|units?|mmol)/mL`)
)

// percents finds a strength in per cent without mg/mL in the same text.
func percents(_ House, text string) []match {
	if !strings.Contains(text, "%") || inMass.MatchString(text) {
		return nil
	}
	var out []match
	for _, at := range percent.FindAllStringIndex(text, -1) {
		start := at[0]
		for start > 0 && strings.ContainsRune("0123456789.,", rune(text[start-1])) {
			start--
		}
		if text[start] == '0' && !strings.ContainsAny(text[start:at[1]], "123456789") || start > 0 && strings.ContainsRune("+-", rune(text[start-1])) {
			continue // nothing, or a change
		}
		if notStrength.MatchString(text[:start]) || partOf.MatchString(text[at[1]:]) {
			continue
		}
		out = append(out, match{from: start, to: at[1]})
	}
	return out
}

var (
	anAmount = regexp.MustCompile(`\b` + number + gap + `(?:mg|g|mcg|micrograms?|nanograms?|units?|milliunits?|mmol|micromol)\b(?:$|[^/\w])`)
	ofVolume = regexp.MustCompile(`\b` + number + gap + `(?:mg|g|mcg|micrograms?|nanograms?|units?|milliunits?|mmol|micromol)(?: in |` + gap + `/` + gap + `)` + number + gap + `mL\b`)
	eachMl   = regexp.MustCompile(`\b` + number + gap + `(mg|g|mcg|micrograms?|nanograms?|units?|milliunits?|mmol|micromol)/mL\b`)
	aRate    = regexp.MustCompile(`\b` + number + gap + `(mg|g|mcg|micrograms?|nanograms?|units?|milliunits?|mmol|micromol)(?:/kg|/m²)?/(?:h|hour|min|day)\b`)
)

// perMillilitre finds an amount in a volume where no concentration stands.
func perMillilitre(_ House, _ string, lines []string) []match {
	text := strings.Join(lines, "\n")
	at := ofVolume.FindStringIndex(text)
	if at == nil || eachMl.MatchString(text) {
		return nil
	}
	return []match{{from: at[0], to: at[1]}}
}

// oneUnit finds a dose rate in another unit of mass than the concentration,
// without the concentration in that unit as well.
func oneUnit(_ House, _ string, lines []string) []match {
	text := strings.Join(lines, "\n")
	have := map[string]bool{}
	for _, g := range eachMl.FindAllStringSubmatch(text, -1) {
		have[strings.TrimSuffix(g[1], "s")] = true
	}
	if len(have) == 0 {
		return nil
	}
	for _, at := range aRate.FindAllStringSubmatchIndex(text, -1) {
		if !have[strings.TrimSuffix(text[at[2]:at[3]], "s")] {
			return []match{{from: at[0], to: at[1]}}
		}
	}
	return nil
}

var (
	noradrenaline = regexp.MustCompile(`(?i)\b(?:noradrenaline|norepinephrine)\b`)
	saysWhich     = regexp.MustCompile(`(?i)\b(?:base|(?:bi)?tartrate)\b`)
	aMass         = regexp.MustCompile(`\b` + number + gap + `(?:mg|g|mcg|micrograms?|nanograms?)\b`)
	electrolyte   = regexp.MustCompile(`(?i)^(?:magnesium sul(?:f|ph)ate|(?:mono)?(?:potassium|calcium) \w+|sodium (?:bicarbonate|phosphate|acetate)|ammonium chloride)`)
)

// baseOrSalt finds a mass of noradrenaline that does not say of what.
func baseOrSalt(_ House, drug string, lines []string) []match {
	text := strings.Join(lines, "\n")
	if !noradrenaline.MatchString(drug) || saysWhich.MatchString(drug+"\n"+text) {
		return nil
	}
	return first(aMass, text)
}

// asMillimoles finds a mass of an electrolyte on a label without mmol.
func asMillimoles(_ House, drug string, lines []string) []match {
	text := strings.Join(lines, "\n")
	if !electrolyte.MatchString(drug) || strings.Contains(text, "mol") {
		return nil
	}
	return first(aMass, text)
}

func first(re *regexp.Regexp, text string) []match {
	if at := re.FindStringIndex(text); at != nil {
		return []match{{from: at[0], to: at[1]}}
	}
	return nil
}
