package quantity

import (
	"math/big"
	"strings"
)

// ParseConcentration reads "2 mg/mL", "400 mg/L", "4 mg in 50 mL", and, on
// input only, per cent ("0.5 %" is 5 mg/mL: p % weight in volume is p g in
// 100 mL) and ratio strengths ("1:1000" or "1 in 1,000" is 1 mg/mL: 1 in n is
// 1 g in n mL; US pharmacopoeia, general chapter 7). It must be above zero.
// Errors are *SyntaxError.
func ParseConcentration(s string) (Concentration, error) { return settle(s, readConcentration) }

func readConcentration(s string) (Concentration, error) {
	text := clean(s)
	if n, ok := ratioOf(text); ok {
		return readRatio(s, text, n)
	}
	if strings.Contains(text, " in ") {
		return readMixed(s, text)
	}
	r, err := cut(s, wantConcentration)
	if err != nil {
		return Concentration{}, err
	}
	if isPercent(r.unit) || r.unit == "% w/v" {
		if err := r.positive(); err != nil {
			return Concentration{}, err
		}
		return Concentration{x: r.x.mul(whole(10)), kind: ByMass, unit: Milligram(), text: r.text}, nil
	}
	if r.unit == "% v/v" || r.unit == "% w/w" {
		return Concentration{}, r.fault(WrongUnit, "a share by volume or by weight is no amount per volume without a density", "")
	}
	return readPerVolume(r)
}

func readMixed(s, text string) (Concentration, error) {
	m, err := readMix(s)
	if err != nil {
		return Concentration{}, err
	}
	c, err := m.amount.In(m.volume)
	c.text = text
	return c, err
}

// readPerVolume reads the unit "mg/mL", "g/L" or "mg/100 mL".
func readPerVolume(r reading) (Concentration, error) {
	parts := slashParts(r.unit)
	u, ok := unitNamed(parts[0])
	if !ok || len(parts) != 2 {
		return Concentration{}, r.unitFault()
	}
	share, vol := whole(1), parts[1]
	if n, rest := splitNumber(vol); n != "" {
		x, code, why := readNumber(n)
		if why != "" {
			return Concentration{}, r.fault(code, why, perMended(r, n, rest))
		}
		share, vol = x, rest
	}
	scale, ok := volumeScale(vol)
	if !ok {
		return Concentration{}, r.unitFault()
	}
	if !share.positive() {
		return Concentration{}, r.fault(ZeroOrLess, "the volume must be more than zero", "")
	}
	if err := r.positive(); err != nil {
		return Concentration{}, err
	}
	return Concentration{x: r.x.mul(u.scale).quo(scale.mul(share)), kind: u.kind, unit: u, text: r.text}, nil
}

// perMended mends the number of the volume in "5 mg/1,000 mL".
func perMended(r reading, number, unit string) string {
	n := likelyNumber(number)
	if n == "" {
		return ""
	}
	return trimZeros(r.number) + " " + slashParts(r.unit)[0] + "/" + n + " " + unit
}

// ratioOf cuts the n out of "1:n", "1 : n" and "1 in n". "1 in 5 mL" is none.
func ratioOf(text string) (string, bool) {
	if head, tail, ok := strings.Cut(text, ":"); ok && strings.TrimSpace(head) == "1" {
		return strings.TrimSpace(tail), true
	}
	n, ok := strings.CutPrefix(text, "1 in ")
	return n, ok && strings.Trim(n, "0123456789.,' ") == ""
}

// readRatio reads 1 in n as 1 g in n mL. n is a whole number from 100 on, at
// most nine digits, plain or set off in threes: "1 in 10" is the language of
// parts, one of drug with nine of diluent, or with ten.
func readRatio(s, text, n string) (Concentration, error) {
	digits := n
	for _, mark := range []string{",", " "} {
		if joined, ok := ungroup(n, mark); ok {
			digits = joined
		}
	}
	if !allDigits(digits) || len(digits) < 3 || len(digits) > 9 || digits[0] == '0' {
		return Concentration{}, &SyntaxError{Got: s, Want: wantConcentration, Code: RatioText,
			Why: "a ratio must be 1 in a whole number from 100 on; a smaller one may mean parts, so write the volumes or mg/mL"}
	}
	of, _ := new(big.Rat).SetString(digits)
	return Concentration{x: whole(1000).quo(exact{r: of}), kind: ByMass, unit: Milligram(), text: text}, nil
}
