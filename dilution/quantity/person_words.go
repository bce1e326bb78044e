package quantity

import "strings"

// The pound is 0.45359237 kg and the inch 2.54 cm, both exactly (international
// yard and pound agreement of 1959). Their names are read in quick sums alone,
// and only when they are written out.

const (
	wantAnyWeight = `a body weight such as "72 kg", or "165 pounds" or "11 stone 4 pounds" written out`
	wantAnyHeight = `a height such as "178 cm", or "5 feet 7 inches" written out`
)

// weightLadder is stones and pounds in kg. Fourteen pounds are a stone.
func weightLadder() ladder {
	return ladder{
		{"stone", "stone", []string{"stones"}, []string{"st", "sts"}, fraction(45359237*14, 100000000), true},
		{"pound", "pounds", nil, []string{"lb", "lbs", "#"}, fraction(45359237, 100000000), false},
	}
}

// heightLadder is feet and inches in cm. Twelve inches are a foot.
func heightLadder() ladder {
	return ladder{
		{"foot", "feet", nil, []string{"ft"}, fraction(3048, 100), true},
		{"inch", "inches", nil, []string{"in", "ins"}, fraction(254, 100), false},
	}
}

// ParseAnyBodyWeight reads what [ParseBodyWeight] does, and pounds and stones
// when they are written out: "165 pounds", "11 stone 4 pounds". The stones are
// whole and fewer than 14 pounds stand behind them. Abbreviations are refused
// with the reading that was probably meant. Errors are *SyntaxError.
func ParseAnyBodyWeight(s string) (BodyWeight, error) { return settle(s, readAnyBodyWeight) }

func readAnyBodyWeight(s string) (BodyWeight, error) {
	text, l := clean(s), weightLadder()
	if !l.owns(text) {
		return readBodyWeight(s)
	}
	x, err := l.total(s, wantAnyWeight)
	if err != nil {
		return BodyWeight{}, inKilogramsToo(l, err)
	}
	return BodyWeight{x: x, text: text}, nil
}

// inKilogramsToo adds what an abbreviated weight would be in kg.
func inKilogramsToo(l ladder, err error) error {
	e, ok := err.(*SyntaxError)
	if !ok || e.Likely == "" {
		return err
	}
	if x, again := l.total(e.Likely, e.Want); again == nil {
		e.Why += "; " + e.Likely + " is about " + inKilograms(x, "")
	}
	return e
}

// ParseAnyLength reads what [ParseLength] does, and feet and inches when they
// are written out: "5 feet 7 inches", "67 inches". The feet are whole and fewer
// than 12 inches stand behind them. Abbreviations and marks are refused with the
// reading that was probably meant. Errors are *SyntaxError.
func ParseAnyLength(s string) (Length, error) { return settle(s, readAnyLength) }

func readAnyLength(s string) (Length, error) {
	text, l := clean(s), heightLadder()
	if spelled := unmarked(text); spelled != text {
		r := reading{got: s, text: text, want: wantAnyHeight}
		return Length{}, r.fault(WrongUnit, "marks for feet and inches can be misread and must be written out", l.spelled(pieces(spelled)))
	}
	if !l.owns(text) {
		return readLength(s)
	}
	x, err := l.total(s, wantAnyHeight)
	if err != nil {
		return Length{}, err
	}
	return Length{x: x, text: text}, nil
}

// unmarked writes out the marks of feet and inches that stand behind a digit:
// 5'7", 5′ 7″.
func unmarked(text string) string {
	words := strings.NewReplacer("''", " inches ", `"`, " inches ", "″", " inches ", "”", " inches ",
		"'", " feet ", "′", " feet ", "’", " feet ")
	if !strings.ContainsAny(text, `'"′″’”`) || strings.Trim(text, `0123456789 '"′″’”`) != "" {
		return text
	}
	return clean(words.Replace(text))
}
