package lint

import (
	"regexp"
	"strconv"
	"strings"
)

// wordRules are about names, words and dates.
func wordRules() []Rule {
	return []Rule{
		{Code: "N04", Fault: "no blank between name and number",
			Says:   "a blank between a drug's name and its number",
			Source: errorProne, Severity: Stop, Scope: EveryText,
			Wrong: []string{"lidocaine20 mg/mL", "propofol10 mg"}, Right: []string{"lidocaine 20 mg/mL", "HM-01", "B12 1 mg"},
			find: each(`\b(([A-Za-z]{4,})(\d[\d.,]*))`+gap+doseUnit+`\b`, func(_ House, g []string) string { return g[2] + " " + g[3] })},
		{Code: "N12", Fault: "letters for the name of a drug",
			Says:   "drugs and salts by their full names, no letters for them",
			Source: doNotUse + "; " + newZealand, Severity: Stop, Scope: EveryText,
			Wrong: []string{"KCl 20 mmol", "EPI 1 mg", "SUX given", "MS 10 mg", "GTN patch"}, Right: []string{"potassium chloride", "EPINEPHrine", "Ms Example", "calcium chloride dihydrate CaCl2.2H2O: 147.01 g/mol"},
			find: shortNames},
		{Code: "N14", Fault: "a sign that stands for a word",
			Says:   "words for @ & + < >",
			Source: doNotUse + ", further items; list of error-prone abbreviations of 2004", Severity: Warn, Scope: EveryText,
			Wrong: []string{"A + B", "< 10 mg", "fentanyl & midazolam", "> 5 mL", "give @ 10:00"}, Right: []string{"A and B", "less than 10", "+01:00", "Na+"},
			find: all(
				each(`([@&])`, func(_ House, g []string) string { return map[string]string{"@": "at", "&": "and"}[g[1]] }),
				each(`[\w)]\s*(\+)\s*[A-Za-z(]`, nil),
				each(`\w (\+) \w`, func(House, []string) string { return "and" }),
				each(`([<>])\s*\d`, nil),
				each(`([<>]) \d`, func(_ House, g []string) string { return map[string]string{"<": "less than", ">": "more than"}[g[1]] }))},
		{Code: "N25", Fault: "a date or time that has two readings, or a use-by without its time",
			Says:   "a date that has one reading, 01 Dec 2026 or 2026-12-01, on the 24-hour clock; use-by with its time",
			Source: ourOwn + "; expiry dates after US Pharmacopeia since 2023", Severity: Stop, Scope: EveryText,
			Wrong: []string{"03/04/25", "3.4.2025", "1-12-2026", "01 Dec 26", "7:30 pm", "7 a.m.", "use by 01 Dec 2026"},
			Right: []string{"2025-04-03 14:30", "01 Dec 2026 19:30", "use by 01 Dec 2026 19:30", "5.4.2 and 5.4.3"},
			find: all(
				each(`\b(\d{1,2}/\d{1,2}/\d{2}(?:\d{2})?)\b`, dated),
				each(`\b(\d{1,2}\.\d{1,2}\.(?:20)?\d{2})\b`, dated),
				each(`\b(\d{1,2}-\d{1,2}-20\d{2})\b`, dated),
				each(`\b(\d{1,2} (?:Jan|Feb|Mar|Apr|May|Jun|Jul|Aug|Sep|Oct|Nov|Dec) \d{2})(?:$|[^\d:])`, nil),
				each(`\b(\d{1,2}(?:[:.]\d{2})?\s?(?:[ap]m\b|[AP]M\b|[ap]\.m\.))`, clock),
				each(`(?i)\b(use[ -]by (?:\d{2} [A-Z][a-z]{2} \d{4}|\d{4}-\d{2}-\d{2}))(?:$|[^\d ]| [^\d])`, nil))},
	}
}

var shortName = regexp.MustCompile(`\b(EPI|NOREPI|NEO|SUX|ROC|VEC|VASO|KCl|KCL|MgSO4|MSO4|MS|NTG|GTN|SNP|TXA|PHE|NaHCO3|CaCl2?)\b`)

// shortNames finds letters that stand for a drug; a chemical formula beside the
// name in full explains itself.
func shortNames(h House, text string) []match {
	var out []match
	for _, at := range shortName.FindAllStringIndex(text, -1) {
		fix := inFull(h, []string{"", text[at[0]:at[1]]})
		hydrate := strings.HasPrefix(text[at[1]:], ".") && len(text) > at[1]+1 && text[at[1]+1] >= '0' && text[at[1]+1] <= '9'
		if hydrate || fix != "" && strings.Contains(text[:at[0]], fix) {
			continue
		}
		out = append(out, match{from: at[0], to: at[1], fix: fix})
	}
	return out
}

// inFull is what the letters stand for, where they stand for one thing. MS is
// morphine or magnesium, NEO neostigmine or phenylephrine; PHE, VASO and ROC
// have more than one reading too.
func inFull(h House, g []string) string {
	us := map[string]string{"EPI": "epinephrine", "NOREPI": "norepinephrine", "SUX": "succinylcholine", "NTG": "nitroglycerin", "GTN": "nitroglycerin"}
	any := map[string]string{"EPI": "adrenaline", "NOREPI": "noradrenaline", "SUX": "suxamethonium", "NTG": "glyceryl trinitrate", "GTN": "glyceryl trinitrate",
		"VEC": "vecuronium", "KCl": "potassium chloride", "KCL": "potassium chloride", "MgSO4": "magnesium sulfate", "MSO4": "morphine sulfate",
		"SNP": "nitroprusside", "TXA": "tranexamic acid", "NaHCO3": "sodium bicarbonate", "CaCl": "calcium chloride", "CaCl2": "calcium chloride"}
	if name, ok := us[g[1]]; ok && h.name == "us" {
		return name
	}
	return any[g[1]]
}

var dateParts = regexp.MustCompile(`^(\d{1,2})[/.-](\d{1,2})[/.-](\d{2,4})$`)

// dated is a date in the house's form where only one reading is possible: one
// of the two small numbers is above 12, and the year has four digits.
func dated(h House, g []string) string {
	p := dateParts.FindStringSubmatch(g[1])
	if p == nil || len(p[3]) != 4 {
		return ""
	}
	a, _ := strconv.Atoi(p[1])
	b, _ := strconv.Atoi(p[2])
	day, month := a, b
	if b > 12 {
		day, month = b, a
	}
	if day <= 12 || day > 31 || month < 1 || month > 12 {
		return ""
	}
	two := func(n int) string { return strings.Repeat("0", 2-len(strconv.Itoa(n))) + strconv.Itoa(n) }
	if h.name == "uk" {
		return two(day) + " " + [...]string{"Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec"}[month-1] + " " + p[3]
	}
	return p[3] + "-" + two(month) + "-" + two(day)
}

var clockParts = regexp.MustCompile(`^(\d{1,2})(?:[:.](\d{2}))?\s?([apAP])`)

// clock is a time of the 12-hour clock on the other.
func clock(_ House, g []string) string {
	p := clockParts.FindStringSubmatch(g[1])
	hour, _ := strconv.Atoi(p[1])
	if hour < 1 || hour > 12 || p[2] > "59" {
		return ""
	}
	if hour %= 12; strings.EqualFold(p[3], "p") {
		hour += 12
	}
	minute := p[2]
	if minute == "" {
		minute = "00"
	}
	return strings.Repeat("0", 2-len(strconv.Itoa(hour))) + strconv.Itoa(hour) + ":" + minute
}
