package lint

import "strings"

// unitRules are about the words for units.
func unitRules() []Rule {
	return []Rule{
		{Code: "N03", Fault: "no blank between number and unit",
			Says:   "a blank between number and unit",
			Source: errorProne + "; " + brochure, Severity: Stop, Scope: EveryText,
			Wrong: []string{"10mg", "100units", "2.5mL", "5micrograms"}, Right: []string{"10 mg", "100 units", "N05CM18", "m2"},
			find: each(`\b((\d[\d.,]*)(mg|g|kg|mcg|ng|micrograms?|nanograms?|mL|ml|L|units?|milliunits?|mmol|micromol|mEq))\b`,
				parted)},
		{Code: "N05", Fault: "a letter for units",
			Says:   "units in full, for international units too; no U, u, IU: read as 0, 4 or IV",
			Source: errorProne + "; " + doNotUse + "; " + bnf, Severity: Stop, Scope: EveryText,
			Wrong: []string{"50 U", "100 IU/mL", "5u", "2 I.U.", "10 UI", "10 IE", "5 mU/min", "2 MU"}, Right: []string{"50 units", "1 unit/mL", "5 milliunits/min"},
			find: each(`\b((`+number+`)`+gap+`(I\.?U\.?|i\.?u\.?|I\.?E\.|U|u|UI|IE|mU|kU|MU))(?:$|[^A-Za-z])`, fullUnits)},
		{Code: "N06", Fault: "microgram in a form that is misread",
			Says:   "microgram as the house writes it, never with a Greek letter or as ug, gamma, microg, mcgs: the letter drops out or is read as m",
			Source: errorProne + "; " + doNotUse + "; " + bnf + "; " + who, Severity: Stop, Scope: EveryText,
			Wrong: []string{"50 \u00b5g/mL", "50 \u03bcg/mL", "50 ug", "50 gamma", "5 microg", "50 mcgs", "50 mcg", "5 \u00b5mol"}, Right: []string{"50 micrograms/mL", "1 microgram"},
			find: all(
				each(`((?:(`+number+`)(`+blank+`*))?[\x{00B5}\x{03BC}]g)\b`, micrograms),
				each(`([\x{00B5}\x{03BC}])mol\b`, func(House, []string) string { return "micro" }),
				each(`([\x{00B5}\x{03BC}][a-fh-ln-zA-Z])`, nil),
				each(`\b((`+number+`)(`+blank+`*)(?:ug|microg|mcgs|gamma))\b`, micrograms),
				only(each(`\b((`+number+`)(`+blank+`*)mcg)\b`, micrograms), "uk", "si"))},
		{Code: "N06b", Fault: "letters for nanogram",
			Says:   "nanogram in full, no ng or nanog: read as mg or nasogastric",
			Source: ismp2024 + "; " + bnf, Severity: Stop, Scope: EveryText,
			Wrong: []string{"10 ng/kg/min", "5 nanog"}, Right: []string{"10 nanograms/kg/min", "1 nanogram", "C. Ng"},
			find: all(
				each(`\b((`+number+`)`+gap+`(?:ng|nanog))\b`, func(_ House, g []string) string { return g[2] + " " + plural("nanogram", g[2]) }),
				each(`(?:^|[^\d\s])\s*\b(ng|nanog)\b`, nil))},
		{Code: "N07", Fault: "cc, ml or ML for mL",
			Says:   "mL with a capital L; no cc, ml, ML",
			Source: errorProne + "; " + doNotUse + "; in SI usage ml passes", Severity: Stop, Scope: EveryText,
			Wrong: []string{"5 ml", "5 cc", "5 ML", "mg/ml", "5 cm3"}, Right: []string{"5 mL", "mg/mL"},
			find: all(
				each(`\b(ML|cc|ccm|cm3)\b`, func(House, []string) string { return "mL" }),
				only(each(`\b(ml)\b`, func(House, []string) string { return "mL" }), "uk", "us"),
				only(graded(Warn, each(`\b(ml)\b`, func(House, []string) string { return "mL" })), "si"))},
	}
}

// placeRules are about what stands around a unit.
func placeRules() []Rule {
	return []Rule{
		{Code: "N10", Fault: "a full stop after a unit",
			Says:   "no full stop after a unit: read as a 1",
			Source: errorProne, Severity: Stop, Scope: EveryText,
			Wrong: []string{"10 mg. in", "10 mg.", "5 mL. then"}, Right: []string{"10 mg in", "Draw up 5 mL. Then mix.", "Make it up to 50 mL."},
			find: all(
				each(`\d`+gap+`((`+doseUnit+`)\.)\s+[a-z]`, second),
				eachIf(`^(?:.*\d`+gap+`)?((`+doseUnit+`)\.)\s*$`, func(g []string) bool { return len(strings.Fields(g[0])) < 4 }, second))},
		{Code: "N11", Fault: "an s on a symbol, or hr for h",
			Says:   "no s on a symbol, hour as h: mg, mL, g, kg, h",
			Source: unseen + "; SI practice", Severity: Warn, Scope: EveryText,
			Wrong: []string{"5 mLs", "mL/hr", "10 mgs", "2 gm", "3 hrs"}, Right: []string{"mL/h", "10 mg", "hour"},
			find: each(`\b(mgs|mLs|mls|gms?|kgs|mmols|hrs?)\b`, func(_ House, g []string) string {
				return map[string]string{"mgs": "mg", "mLs": "mL", "mls": "mL", "gm": "g", "gms": "g", "kgs": "kg", "mmols": "mmol", "hr": "h", "hrs": "h"}[g[1]]
			})},
		{Code: "N18", Fault: "a unit before its number, or two units for one quantity",
			Says:   "the number first, then one unit",
			Source: brochure, Severity: Stop, Scope: EveryText,
			Wrong: []string{"mg 5", "1 g 500 mg", "dose mg 5"}, Right: []string{"5 mg", "1.5 g", "5 mg 2 times", "5 mg in 2 mL"},
			find: all(
				each(`(?:^|[^\d\s]`+blank+`)((mg|mcg|micrograms?|mL|ng)`+blank+`(`+number+`))(?:[^\d/.\x{00A0}\x{202F}]|$)`, func(_ House, g []string) string { return g[3] + " " + g[2] }),
				each(`\b((\d+)`+gap+`g`+blank+`(\d{3})`+gap+`mg)\b`, func(_ House, g []string) string { return trimmed(g[2]+"."+g[3]) + " g" }))},
		{Code: "N20", Fault: "a slash between an amount and a volume",
			Says:   "in or per between an amount and a volume; a slash stands only inside a unit such as mg/mL: read as a 1",
			Source: "list of error-prone abbreviations of the same institute, 2004", Severity: Warn, Scope: EveryText,
			Wrong: []string{"25 units/50 mL", "25 units/10 units"}, Right: []string{"25 units in 50 mL", "5 mg/mL"},
			find: each(`\b(`+number+gap+doseUnit+blank+`?/`+blank+`?`+number+gap+doseUnit+`)\b`, inVolume)},
		{Code: "N26", Fault: "number and unit on two lines",
			Says:   "number and unit on one line, name and concentration on one label",
			Source: isoNumbers, Severity: Stop, Scope: EveryText,
			Wrong: []string{"10\nmg", "give 5\n mL"}, Right: []string{"give\n10 mg"},
			find: each(`(\d[ \t]*\r?\n\s*`+doseUnit+`)\b`, nil)},
		{Code: "N27", Fault: "number and unit in different sizes",
			Says:   "number and unit in digits and letters of one size",
			Source: ourOwn, Severity: Warn, Scope: OnPaper, Held: "a figure is one piece of text in one size: layouts, TestFiguresHaveOneSize"},
	}
}

// parted is a number without zeros too many, a blank, and its unit.
func parted(_ House, g []string) string {
	n := g[2]
	if strings.Contains(n, ".") {
		n = trimmed(n)
	}
	return n + " " + g[3]
}

// second is the second group of a match.
func second(_ House, g []string) string { return g[2] }

// fullUnits is a count of units in full.
func fullUnits(_ House, g []string) string {
	switch g[3] {
	case "mU":
		return g[2] + " " + plural("milliunit", g[2])
	case "kU", "MU":
		return ""
	}
	return g[2] + " " + plural("unit", g[2])
}

// micrograms is a count of micrograms as the house writes them.
func micrograms(h House, g []string) string {
	if g[2] == "" {
		return h.microgram("1")
	}
	return g[2] + " " + h.microgram(g[2])
}

// inVolume is "25 units in 50 mL" for "25 units/50 mL", nothing for what is no
// volume.
func inVolume(_ House, g []string) string {
	amount, volume, _ := strings.Cut(g[1], "/")
	if !strings.HasSuffix(volume, "mL") || strings.HasSuffix(amount, "mL") {
		return ""
	}
	return strings.TrimSpace(amount) + " in " + strings.TrimSpace(volume)
}
