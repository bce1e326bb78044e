package lint

import (
	"math/big"
	"strings"
)

// Sources that several rules share.
const (
	errorProne  = "Institute for Safe Medication Practices, list of error-prone abbreviations, symbols and dose designations, 2021"
	doNotUse    = "Joint Commission, \"Do Not Use\" list"
	bnf         = "British National Formulary, prescription writing"
	brochure    = "SI Brochure, 5.3.3"
	isoNumbers  = "ISO style for numbers, as restated by ETSI"
	usp7        = "US Pharmacopeia, general chapter 7, 2016"
	unseen      = "from memory, unverified"
	ourOwn      = "our reading, no source"
	divi        = "DIVI, labelling of syringes, 2012"
	palliative  = "Scottish Palliative Care Guidelines, decimal points"
	newZealand  = "New Zealand list of error-prone abbreviations"
	asa         = "American Society of Anesthesiologists, statement on labelling, 2020"
	ismp2024    = "Institute for Safe Medication Practices, update of 2024"
	who         = "WHO country guideline, prescription rules"
	reportedFDA = "US regulator, single-entity injectables without ratio, 2016"
)

// numberRules are about the digits.
func numberRules() []Rule {
	return []Rule{
		{Code: "N01", Fault: "a zero at the end behind a decimal sign",
			Says:   "no zero at the end behind a decimal sign: lost, the sign makes it tenfold",
			Source: errorProne + "; " + doNotUse + "; " + bnf, Severity: Stop, Scope: EveryText,
			Wrong: []string{"1.0 mg", "2.50 mL", "0.10 mg", "1.0mg", "10.00 units", "5.0 mmol"}, Right: []string{"10 mg", "1,000 units", "1.05 mg", "0.1 mg", "version 2.0"},
			find: each(`\b(\d[\d,]*\.\d*?0+)`+gap+`(?:(?:`+doseUnit+`|cm|h|min)\b|%)`, func(_ House, g []string) string { return trimmed(g[1]) })},
		{Code: "N02", Fault: "a decimal sign without a zero before it",
			Says:   "a zero before a decimal sign: unseen, the bare point makes it tenfold or more",
			Source: errorProne + "; " + doNotUse + "; " + bnf, Severity: Stop, Scope: EveryText,
			Wrong: []string{".5 mg", "give .25 mL", "lidocaine.5 mg", "(.5 mL)", ",5 mg"}, Right: []string{"0.5 mg", "e.g.5", "1.5 mg"},
			find: all(
				each(`(?:^|[^0-9A-Za-z.,])(\.\d+)`, func(_ House, g []string) string { return "0" + g[1] }),
				each(`[A-Za-z](\.\d+)`+gap+doseUnit+`\b`, func(_ House, g []string) string { return " 0" + g[1] }),
				each(`(?:^|[\s(])(,\d+)`+gap+doseUnit+`\b`, nil))},
		{Code: "N09", Fault: "thousands without the sign of the house, or a comma as decimal sign",
			Says:   "digits in groups of three from 1,000 on, by the house's sign; a comma is never a decimal sign",
			Source: errorProne + "; " + isoNumbers, Severity: Stop, Scope: EveryText,
			Wrong: []string{"10000 units", "1000000 units", "5000 units", "1,5 mg", "10,0000 units"}, Right: []string{"10,000 units", "10\u202f000 units", "0.0405 mg", "100 units"},
			find: all(
				each(`(?:^|[^\d.,])(\d{5,})(?:\.\d+)?`+gap+doseUnit+`\b`, grouped),
				graded(Warn, each(`(?:^|[^\d.,])(\d{4})(?:\.\d+)?`+gap+doseUnit+`\b`, grouped)),
				each(`(?:^|[^\d.,])(\d+,(?:\d{1,2}|\d{4,}))`+gap+doseUnit+`\b`, nil),
				only(each(`(?:^|[^\d.,])(\d{1,3}(?:,\d{3})+)(?:\.\d+)?`+gap+doseUnit+`\b`, nil), "si"),
				only(graded(Warn, each(`(?:^|[^\d.,])(\d{1,3}(?:[\x{00A0}\x{2009}\x{202F}]\d{3})+)(?:\.\d+)?`+gap+doseUnit+`\b`,
					func(h House, g []string) string { return h.group(digits(g[1])) })), "us"))},
		{Code: "N15", Fault: "a letter for thousand or million",
			Says:   "thousand and million in digits or in full, no k, K or M",
			Source: unseen, Severity: Stop, Scope: EveryText,
			Wrong: []string{"5 K units", "5M units", "10 MM units", "5 mil"}, Right: []string{"5 million units", "5 kg", "5,000 units"},
			find: each(`\b((\d+)(?:\.\d+)?`+gap+`(k|K|M|MM|mil))\b`, thousands)},
		{Code: "N16", Fault: "a unit that makes the number needlessly small or large",
			Says:   "the unit that makes the number 1 or more: from 1 g in g, below in mg, below 1 mg in micrograms",
			Source: bnf + "; " + who + "; from 0.1 mg on " + divi + " keeps mg, which we do not follow", Severity: Warn, Scope: ChosenFigure,
			Wrong: []string{"0.05 mg/mL", "0.5 g", "2000 mg"}, Right: []string{"50 micrograms/mL", "500 mg", "0.3 mg/kg", "1 g"},
			find: all(
				each(`(?:^|[^\d.,])((0\.\d+)`+gap+`(g|mg))(?:/mL)?(?:[^/\w]|$)`, smaller),
				each(`(?:^|[^\d.,])((\d{1,3},\d{3}|\d{4,6})`+gap+`(mg))(?:[^/\w]|$)`, larger))},
		{Code: "N17", Fault: "many decimals",
			Says:   "few decimals: a dose or volume with one at most, where another concentration allows it",
			Source: palliative + "; " + divi, Severity: Warn, Scope: ChosenFigure,
			Wrong: []string{"6.25 mg", "0.375 mL"}, Right: []string{"6.2 mg", "0.05 microgram/kg/min"},
			find: each(`(?:^|[^\d.,])(\d+\.\d{2,}`+gap+`(?:mg|g|mcg|micrograms?|nanograms?|mL|units?|mmol))(?:/mL)?(?:[^/\w]|$)`, nil)},
	}
}

// digitRules are about digits that are no plain number, or too many of them.
func digitRules() []Rule {
	return []Rule{
		{Code: "N21", Fault: "a Roman numeral, a fraction or a power of ten",
			Says:   "plain Arabic digits: no Roman numerals, no fractions, no powers of ten",
			Source: errorProne, Severity: Stop, Scope: EveryText,
			Wrong: []string{"V mg", "1/2 mL", "\u00bd mL", "1e-05 g", "4.5E+03 units", "1e3 units"}, Right: []string{"5 mg", "0.5 mL", "IV 5 mg", "5 mL/h", "ref 3e607088"},
			find: all(
				each(`(?:^|[\s(])([IVX]+)`+blank+doseUnit+`\b`, roman),
				each(`\b(\d+/\d+)`+gap+doseUnit+`\b`, halves),
				each(`([\x{00BC}-\x{00BE}\x{2150}-\x{215E}])`, nil),
				each(`\b(\d+(?:\.\d+)?[eE][+-]\d+|\d+\.\d+[eE]\d+)\b`, nil),
				each(`\b(\d+[eE]\d+)`+gap+doseUnit+`\b`, nil))},
		{Code: "N28", Fault: "more digits than a figure can mean",
			Says:   "a number that was rounded has three digits, one that is exact four at most; more stand where the working is shown",
			Source: ourOwn, Severity: Warn, Scope: EveryText,
			Wrong: []string{"4.999999 mg/mL", "0.30000000000000004 mg"}, Right: []string{"5 mg/mL", "99.55 mg", "0.0405 mg", "1,234.5 mL", "62.3456 kg"},
			find: eachIf(`(?:^|[^\d.,])(\d[\d,]*\.\d{3,})`+gap+`((?:`+doseUnit+`|%)(?:/mol)?)`, func(g []string) bool {
				return g[2] != "kg" && g[2] != "g/mol" && len(strings.TrimLeft(digits(g[1]), "0")) > 4
			}, nil)},
	}
}

// trimmed is a decimal number without zeros at its end.
func trimmed(s string) string { return strings.TrimSuffix(strings.TrimRight(s, "0"), ".") }

// digits are the digits of a number.
func digits(s string) string {
	return strings.Map(func(r rune) rune {
		if r < '0' || r > '9' {
			return -1
		}
		return r
	}, s)
}

func grouped(h House, g []string) string { return h.group(g[1]) }

// thousands is "5 K" in digits and "5 M" in words; the others have two readings.
func thousands(h House, g []string) string {
	if !strings.HasPrefix(g[1], g[2]+".") && len(g[2]) < 7 {
		switch g[3] {
		case "k", "K":
			return h.group(g[2] + "000")
		case "M":
			return g[2] + " million"
		}
	}
	return ""
}

// roman is a Roman numeral of doses in digits.
func roman(_ House, g []string) string {
	for n, r := range []string{"I", "II", "III", "IV", "V", "VI", "VII", "VIII", "IX", "X"} {
		if r == g[1] {
			return new(big.Int).SetInt64(int64(n + 1)).String()
		}
	}
	return ""
}

// halves is a plain fraction as a decimal, if it ends within two digits.
func halves(_ House, g []string) string {
	r, ok := new(big.Rat).SetString(g[1])
	if !ok || !new(big.Rat).Mul(r, big.NewRat(100, 1)).IsInt() {
		return ""
	}
	if r.IsInt() {
		return r.RatString()
	}
	return trimmed(r.FloatString(2))
}

// smaller is a mass below 1 in the unit below.
func smaller(h House, g []string) string {
	r, ok := new(big.Rat).SetString(g[2])
	if !ok || r.Sign() == 0 {
		return ""
	}
	unit := g[3]
	for r.Cmp(big.NewRat(1, 1)) < 0 && (unit == "g" || unit == "mg") {
		r.Mul(r, big.NewRat(1000, 1))
		unit = map[string]string{"g": "mg", "mg": "microgram"}[unit]
	}
	n := trimmedDecimal(r)
	if unit == "microgram" {
		unit = h.microgram(n)
	}
	return n + " " + unit
}

// larger is a mass from 1,000 mg on in g.
func larger(_ House, g []string) string {
	r, ok := new(big.Rat).SetString(strings.ReplaceAll(g[2], ",", ""))
	if !ok {
		return ""
	}
	return trimmedDecimal(r.Quo(r, big.NewRat(1000, 1))) + " g"
}

// trimmedDecimal is a fraction that ends, in digits.
func trimmedDecimal(r *big.Rat) string {
	if r.IsInt() {
		return r.RatString()
	}
	return trimmed(r.FloatString(12))
}
