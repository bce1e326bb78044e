package layouts

import (
	"fmt"
	"strings"

	"drawup/dilution/refusal"
	"drawup/labels"
	"drawup/layouts/ink"
)

// A pattern is a label on the corner of a page, for all labels that are alike
// but for serial number and barcode.
type pattern struct {
	drawing
	form   int             // of the code
	before string          // stands before the serial number
	why    *refusal.Reason // why it cannot be printed, or not whole
}

// keptPatterns is how many patterns an arranger remembers: a batch needs one, a
// day's list some dozens, and a list without any two alike must not pile them
// up.
const keptPatterns = 256

// An arranger arranges labels for a stock. It keeps what it has arranged: labels
// of a batch differ in serial number and code alone, and digits are equally
// wide.
type arranger struct {
	stock Stock
	mono  bool
	known map[string]pattern
	made  map[string]choice // by the key with all digits alike
	key   []byte
	fits  [256]bool // runes that all faces of a label can show
}

func newArranger(s Stock, mono bool) arranger {
	out := arranger{stock: s, mono: mono, known: map[string]pattern{}, made: map[string]choice{}}
	for r := range rune(len(out.fits)) {
		out.fits[r] = !lacking(r)
	}
	return out
}

// lacking says whether a face that a label may be set in cannot show a rune.
func lacking(r rune) bool {
	for _, f := range []ink.Face{ink.Bold, ink.CondensedSemiBold, ink.CondensedRegular} {
		if !faceOf(f).Covers(r) {
			return true
		}
	}
	return false
}

// set gives the pattern of a label and the rows of its barcode, or why it
// cannot be printed. A caution comes with a pattern.
func (s *arranger) set(l labels.Label) (pattern, []string, *refusal.Reason) {
	if missing := s.missing(l); len(missing) > 0 {
		return pattern{}, nil, &refusal.Reason{Code: refusal.GlyphMissing, Severity: refusal.Refuse, Syringe: l.Number,
			Message: fmt.Sprintf("The label of %s has letters that cannot be printed: %q.", l.Name, string(missing)), Field: "label",
			Got: fmt.Sprintf("%q", string(missing)), Want: "letters of the embedded faces", Remedy: "spell it in other letters"}
	}
	symbols, err := symbolsOf(l)
	if err != nil {
		return pattern{}, nil, noCode(l, err)
	}
	s.key = appendKey(s.key[:0], l, symbols)
	p, ok := s.known[string(s.key)]
	if !ok {
		p = s.arrange(l, symbols)
		if len(s.known) >= keptPatterns {
			s.known = map[string]pattern{}
		}
		s.known[string(s.key)] = p
	}
	var modules []string
	if len(symbols) > 0 && (p.why == nil || p.why.Severity != refusal.Refuse) {
		if modules, err = symbols[p.form].rows(); err != nil {
			return pattern{}, nil, noCode(l, err)
		}
	}
	if p.why == nil {
		return p, modules, nil
	}
	why := *p.why
	why.Syringe = l.Number
	return p, modules, &why
}

// noCode is the refusal of a code that breaks the GS1 rules.
func noCode(l labels.Label, err error) *refusal.Reason {
	var forms []string
	for _, code := range l.Codes {
		forms = append(forms, code.Text)
	}
	return &refusal.Reason{Code: refusal.TextTooLong, Severity: refusal.Refuse, Syringe: l.Number,
		Message: "The barcode of " + l.Name + " cannot be made: " + err.Error() + ".", Field: "barcode",
		Got: strings.Join(forms, ", "), Want: "a code after the GS1 rules"}
}

// missing is every rune of the label that a face it may be set in cannot show.
func (s *arranger) missing(l labels.Label) []rune {
	var missing []rune
	l.Each(func(text string) {
		for _, r := range text {
			if int(r) < len(s.fits) && s.fits[r] || int(r) >= len(s.fits) && !lacking(r) {
				continue
			}
			if !strings.ContainsRune(string(missing), r) {
				missing = append(missing, r)
			}
		}
	})
	return missing
}

// arrange finds out how the label fits the stock, and if not why. Where only
// digits of the small type differ from a label seen before, all widths and
// places where a line may be broken are the same, and so is what the search
// would choose.
func (s *arranger) arrange(l labels.Label, symbols []symbol) pattern {
	panel := s.stock.panel(ink.Point{})
	digits := alikeKey(s.key, l)
	if made, ok := s.made[digits]; ok {
		if a, ok := repeat(l, panel, s.stock, s.mono, symbols, made); ok {
			return patternOf(a, l)
		}
	}
	a, why := arrange(l, panel, s.stock, s.mono, symbols)
	if why == "" {
		if len(s.made) >= keptPatterns {
			s.made = map[string]choice{}
		}
		s.made[digits] = a.chosen
		return patternOf(a, l)
	}
	if !l.Infusion && len(l.Dose) > 0 {
		short := l
		short.Dose = nil
		if a, still := arrange(short, panel, s.stock, s.mono, symbols); still == "" {
			p := patternOf(a, l)
			p.why = &refusal.Reason{Code: refusal.TextTooLong, Severity: refusal.Caution,
				Message: fmt.Sprintf("The label of %s has no room for the dose; the draw-up sheet has it.", l.Name), Field: "stock",
				Got: s.stock.Name, Want: "a larger stock, if the label must show it"}
			return p
		}
	}
	return pattern{why: &refusal.Reason{Code: refusal.LabelTooSmall, Severity: refusal.Refuse,
		Message: fmt.Sprintf("The label of %s does not fit stock %s: no room for %s.", l.Name, s.stock.Name, why),
		Field:   "stock", Got: s.stock.Name, Want: "a stock that holds every line of the label", Rule: "R15",
		Source: "ISO 26825:2020, 5.4.2 and 5.4.3 for the name", Remedy: s.larger(l, symbols)}}
}

// alikeKey is a key with all digits alike but those of names and
// concentrations, whose heights count too.
func alikeKey(key []byte, l labels.Label) string {
	out := append([]byte{}, key...)
	for i, c := range out {
		if c >= '0' && c <= '9' {
			out[i] = '0'
		}
	}
	for _, text := range []string{l.Name, l.Second, l.Concentration.Text, l.SecondConcentration.Text} {
		out = append(append(out, 0), text...)
	}
	return string(out)
}

func patternOf(a arrangement, l labels.Label) pattern {
	p := pattern{drawing: a.draw(), form: a.chosen.form}
	if p.serial >= 0 {
		if text, ok := p.marks[p.serial].(ink.Text); ok {
			p.before = strings.TrimSuffix(text.String, l.Serial.Text)
		}
	}
	return p
}

// larger names the next larger stock that holds the label.
func (s *arranger) larger(l labels.Label, symbols []symbol) string {
	for _, larger := range Stocks() {
		if larger.LabelW*larger.LabelH <= s.stock.LabelW*s.stock.LabelH {
			continue
		}
		if _, why := arrange(l, larger.panel(ink.Point{}), larger, s.mono, symbols); why == "" {
			return "use stock " + larger.Name
		}
	}
	return "no larger stock holds it: shorten the words of the label"
}

// appendKey writes all that decides how a label is arranged: every word of it,
// the serial number but for its digits, and of the barcode's forms their sizes.
func appendKey(key []byte, l labels.Label, symbols []symbol) []byte {
	word := func(text string) { key = append(append(key, text...), 0) }
	line := func(line labels.Line) {
		for _, c := range line {
			word(c.Text)
			if c.Figure != "" {
				key = append(key, 1) // decides where the line may be broken
			}
		}
		key = append(key, 2)
	}
	for _, text := range []string{l.Class.Code, l.Class.Word, l.Name, l.Other, l.Second, l.As, l.Concentration.Text, l.SecondConcentration.Text, l.Route, l.Patient, l.Digest} {
		word(text)
	}
	for _, row := range []labels.Line{l.Amount, l.Substance, l.UseBy, l.Prepared, l.Dose, l.Diluent} {
		line(row)
	}
	for _, mark := range l.Marks {
		word(mark)
	}
	key = append(key, 2)
	for _, symbol := range symbols {
		key = append(key, byte(symbol.side))
	}
	key = append(key, 2)
	c := l.Class
	key = append(key, c.Fill.R, c.Fill.G, c.Fill.B, c.LetterOnBar.R, c.LetterOnBar.G, c.LetterOnBar.B)
	for _, flag := range [...]bool{l.Infusion, l.CheckedBy, c.Stripes, c.Bar, c.Line} {
		if flag {
			key = append(key, 1)
		}
		key = append(key, 0)
	}
	for _, r := range l.Serial.Text {
		if r >= '0' && r <= '9' {
			r = '0'
		}
		key = append(key, string(r)...)
	}
	return key
}
