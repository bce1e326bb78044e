package recheck

import (
	"math/big"
	"regexp"
	"slices"
	"strings"
	"time"
)

// This file alters one printed text in all the ways in which a figure goes
// wrong between the sum and the paper.

var numberInText = regexp.MustCompile(`[0-9][0-9,]*(\.[0-9]+)?`)

// alterations lists the altered texts, without the text itself.
func alterations(name, text string) []string {
	out := alteredNumbers(text)
	out = append(out, alteredDigits(text)...)
	out = append(out, alteredUnits(text)...)
	out = append(out, alteredWords(text)...)
	out = append(out, alteredMoments(text)...)
	if key, _ := splitRow(name); key == Code+".*.text" || key == ATC {
		for i, r := range text {
			if r >= 'A' && r <= 'Z' || r >= 'a' && r <= 'z' {
				out = append(out, text[:i]+string(r+1)+text[i+1:])
			}
		}
	}
	slices.Sort(out)
	out = slices.Compact(out)
	return slices.DeleteFunc(out, func(s string) bool { return s == text })
}

// alteredNumbers changes each number by one in its last digit and by the
// factors 10, 1/10, 60, 1/60, 1000, 1/1000, 2 and 1/2, printed in style.
func alteredNumbers(text string) []string {
	var out []string
	for _, at := range numberInText.FindAllStringIndex(text, -1) {
		digits := strings.ReplaceAll(text[at[0]:at[1]], ",", "")
		n := decimalOf(digits)
		last := rat(1, 1)
		if _, back, point := strings.Cut(digits, "."); point {
			last = new(big.Rat).SetFrac(big.NewInt(1), new(big.Int).Exp(big.NewInt(10), big.NewInt(int64(len(back))), nil))
		}
		changed := []*big.Rat{add(n, last), sub(n, last), add(n, quo(last, rat(10, 1))), sub(n, quo(last, rat(10, 1)))}
		for _, f := range []*big.Rat{rat(10, 1), rat(1, 10), rat(60, 1), rat(1, 60), rat(1000, 1), rat(1, 1000), rat(2, 1), rat(1, 2)} {
			changed = append(changed, mul(n, f))
		}
		for _, c := range changed {
			if c.Sign() < 0 {
				continue
			}
			out = append(out, text[:at[0]]+comma(plain(c))+text[at[1]:])
		}
	}
	return out
}

// alteredDigits changes every single digit, drops it, doubles it, swaps it with
// its neighbour, and moves or drops the point.
func alteredDigits(text string) []string {
	var out []string
	for i := 0; i < len(text); i++ {
		c := text[i]
		switch {
		case c >= '0' && c <= '9':
			up, down := string('0'+(c-'0'+1)%10), string('0'+(c-'0'+9)%10)
			out = append(out, text[:i]+up+text[i+1:], text[:i]+down+text[i+1:], text[:i]+text[i+1:], text[:i]+string(c)+text[i:])
			if i+1 < len(text) {
				out = append(out, text[:i]+text[i+1:i+2]+string(c)+text[i+2:])
			}
		case c == '.' || c == ',' || c == ' ':
			out = append(out, text[:i]+text[i+1:])
		}
	}
	return out
}

// alteredUnits swaps every unit word for each of its rivals.
func alteredUnits(text string) []string {
	rivals := [][2]string{
		{" g", " mg"}, {" mg", " g"}, {" mg", " micrograms"}, {" micrograms", " mg"}, {" micrograms", " nanograms"}, {" nanograms", " micrograms"},
		{" mg", " mcg"}, {" mg", " nanograms"}, {" units", " milliunits"}, {" milliunits", " units"}, {" units", " mg"}, {" mg", " units"},
		{" mmol", " micromol"}, {" micromol", " mmol"}, {" mmol", " mg"}, {" mg", " mmol"}, {" mL", " L"}, {" L", " mL"}, {"/mL", "/L"}, {"/mL", ""},
		{"/h", "/min"}, {"/min", "/h"}, {"/h", "/day"}, {"/min", "/day"}, {"/h", ""}, {"/min", ""}, {"/kg", "/m²"}, {"/m²", "/kg"}, {"/kg", ""}, {"/m²", ""},
		{" h", " min"}, {" min", " h"}, {" kg", " cm"}, {" cm", " kg"}, {" kg", " m²"}, {" m²", " kg"}, {" %", " mg"}, {" %", ""}, {" mL", " mg"}, {" mg", " mL"},
		{"mg/mL", "ug/mL"}, {"ug/mL", "mg/mL"}, {"ug/mL", "ng/mL"}, {"unit/mL", "mg/mL"}, {"mmol/mL", "mg/mL"}, {" kg", " lb"}, {" years", " months"}, {" years", " days"},
		{"/g", "/mg"}, {"/mL", "/h"}, {"/h", "/mL"},
	}
	var out []string
	for _, r := range rivals {
		for at := strings.Index(text, r[0]); at >= 0; {
			end := at + len(r[0])
			if end == len(text) || strings.ContainsRune(" /", rune(text[end])) {
				out = append(out, text[:at]+r[1]+text[end:])
			}
			next := strings.Index(text[end:], r[0])
			if next < 0 {
				break
			}
			at = end + next
		}
	}
	return out
}

// alteredWords swaps a word for every other of its list.
func alteredWords(text string) []string {
	lists := [][]string{
		{"neat", "make up to", "add to", "withdraw, then add"},
		{"actual", "ideal", "adjusted", "lean", "surface", "none", "james"},
		{"per minute for per hour", "per hour for per minute", "ten times", "a tenth", "pounds for kilograms"},
		{"male", "female"},
		{"nothing", "1 % more", "0.1 % less", "0 % more"},
	}
	var out []string
	for from, to := range map[string]string{" more": " less", " less": " more"} {
		if front, ok := strings.CutSuffix(text, from); ok {
			out = append(out, front+to, front, "nothing")
		}
	}
	for _, words := range lists {
		if slices.Contains(words, text) {
			out = append(out, words...)
			out = append(out, "", strings.ToUpper(text))
		}
	}
	return out
}

// alteredMoments moves a date by a minute, an hour, half a day, a day, a month
// and a year, and writes it in the other style; an offset by its sign, an hour
// and a quarter.
func alteredMoments(text string) []string {
	var out []string
	for _, layout := range []string{"02 Jan 2006 15:04", "2006-01-02 15:04"} {
		t, err := time.Parse(layout, text)
		if err != nil {
			continue
		}
		for _, d := range []time.Duration{time.Minute, time.Hour, 12 * time.Hour, 24 * time.Hour} {
			out = append(out, t.Add(d).Format(layout), t.Add(-d).Format(layout))
		}
		for _, months := range []int{1, -1, 12, -12} {
			out = append(out, t.AddDate(0, months, 0).Format(layout))
		}
		out = append(out, t.Format("02 Jan 06 15:04"), t.Format("02/01/2006 15:04"), t.Format("01/02/2006 15:04"), t.Format("02 Jan 2006 03:04"))
	}
	if len(text) == 6 && strings.ContainsAny(text[:1], "+-") {
		out = append(out, map[byte]string{'+': "-", '-': "+"}[text[0]]+text[1:], "+01:00", "+02:00", "+00:00", "-00:00", "-05:00", text[:4]+"15", "Z", "UTC")
	}
	return out
}
