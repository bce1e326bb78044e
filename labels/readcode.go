package labels

import (
	"fmt"
	"regexp"
	"strings"
	"time"

	"drawup/dilution/quantity"
	"drawup/labels/gs1"
)

// A CodeKind is what a scanned code belongs to.
type CodeKind int

// Kinds of codes. The zero value is none.
const (
	KindLabel   CodeKind = iota + 1 // a label of this tool in the internal form
	KindProduct                     // a product under a trade item number: a pack, or a label with a site's own number
	KindOther                       // element strings that are neither
)

// A Coded is what a code says. What it does not say is not given or empty.
type Coded struct {
	Kind          CodeKind
	Number        string // of the product, 14 digits
	ATC           string
	Concentration quantity.Concentration
	Second        quantity.Concentration // of the second drug of a mixture
	Amount        quantity.Amount
	// UseBy is the last moment at which it may be used, as the clock on the wall
	// shows it where it was made; WholeDay says that the code gives a day only,
	// WholeMonth that it gives a month.
	UseBy                time.Time
	WholeDay, WholeMonth bool
	Batch                string
	Serial               string
	Formulary            string // first digits of the formulary's digest
}

// ReadCode reads a code by the rules at the top of code.go; now settles the
// century of two-digit years. The code has been scanned without a fault. The
// company-internal values of a product are read only where they are of this
// tool's form: another company may use them otherwise.
func ReadCode(s gs1.Scanned, now time.Time) (Coded, []gs1.Fault) {
	has := map[string]gs1.Found{}
	for _, e := range s.Elements {
		has[e.AI] = e
	}
	out := Coded{Kind: KindOther}
	_, number := has["01"]
	_, first := has[codeDrug]
	_, second := has[codeUntil]
	var faults []gs1.Fault
	switch {
	case number:
		out.Kind = KindProduct
		out.Number, out.Batch, out.Serial = has["01"].Value, has["10"].Value, has["21"].Value
		out.expiry(has, now)
		if whole := (&Coded{}).internal(has, now); len(whole) == 0 {
			out.internal(has, now)
		}
	case first || second:
		out.Kind = KindLabel
		faults = out.internal(has, now)
		for _, ai := range []string{codeDrug, codeUntil, codeConcentration} {
			if _, ok := has[ai]; !ok && len(faults) == 0 {
				faults = append(faults, gs1.Fault{Kind: gs1.Content, AI: ai, At: s.Elements[0].At, Got: "no (" + ai + ")",
					Want: "it in every label of this tool: drug in (91), use-by and serial in (92), concentration in (93)"})
			}
		}
	}
	return out, faults
}

// forms are the values of the internal identifiers.
var forms = map[string]*regexp.Regexp{
	codeDrug:          regexp.MustCompile(`^[A-Z]\d\d[A-Z][A-Z]\d\d`),
	codeUntil:         regexp.MustCompile(`^\d{18}`),
	codeConcentration: regexp.MustCompile(`^(\d+(?:\.\d+)?)(mg|ug|ng|unit|mmol|umol)/mL`),
	codeAmount:        regexp.MustCompile(`^(\d+(?:\.\d+)?)(g|mg|ug|ng|unit|mmol|umol)`),
	codeFormulary:     regexp.MustCompile(`^[0-9a-f]{8}`),
	codeSecond:        regexp.MustCompile(`^(\d+(?:\.\d+)?)(mg|ug|ng|unit|mmol|umol)/mL`),
}

// wants says what a value of the internal form looks like.
func wants(ai string) string {
	return map[string]string{
		codeDrug: "an ATC code such as N01AX07", codeUntil: "the use-by in ten digits and the serial in eight",
		codeConcentration: "a concentration such as 2mg/mL", codeAmount: "an amount such as 20mg",
		codeFormulary: "eight digits of the formulary's digest", codeSecond: "a concentration such as 500ug/mL",
	}[ai]
}

// internal reads the values of 91 to 96.
func (c *Coded) internal(has map[string]gs1.Found, now time.Time) []gs1.Fault {
	var faults []gs1.Fault
	for _, ai := range []string{codeDrug, codeUntil, codeConcentration, codeAmount, codeFormulary, codeSecond} {
		e, ok := has[ai]
		if !ok {
			continue
		}
		if f := c.value(e, now); f != nil {
			faults = append(faults, *f)
		}
	}
	return faults
}

// value reads one internal value. A value of the right form with more behind it
// that begins with another identifier has lost its separator on the way.
func (c *Coded) value(e gs1.Found, now time.Time) *gs1.Fault {
	fault := &gs1.Fault{Kind: gs1.Content, AI: e.AI, At: e.ValueAt, Got: fmt.Sprintf("%q", e.Value), Want: wants(e.AI)}
	parts := forms[e.AI].FindStringSubmatch(e.Value)
	if parts == nil {
		return fault
	}
	if rest := e.Value[len(parts[0]):]; rest != "" {
		if len(rest) > 2 && rest[0] == '9' && rest[1] >= '1' && rest[1] <= '6' {
			fault.Kind, fault.At = gs1.Lost, e.ValueAt+len(parts[0])
			fault.Got, fault.Want = fmt.Sprintf("%q behind %q", rest, parts[0]), "a separator between them"
		}
		return fault
	}
	var err error
	switch e.AI {
	case codeDrug:
		c.ATC = e.Value
	case codeUntil:
		c.Serial = e.Value[len(codedMoment):]
		c.UseBy, err = moment(e.Value[:len(codedMoment)], now)
	case codeConcentration:
		c.Concentration, err = quantity.ParseConcentration(parts[1] + " " + typedUnit(parts[2]) + "/mL")
	case codeSecond:
		c.Second, err = quantity.ParseConcentration(parts[1] + " " + typedUnit(parts[2]) + "/mL")
	case codeAmount:
		c.Amount, err = quantity.ParseAmount(parts[1] + " " + typedUnit(parts[2]))
	case codeFormulary:
		c.Formulary = e.Value
	}
	if err != nil {
		return fault
	}
	return nil
}

// typedUnit is a unit word of the code as people type it.
func typedUnit(word string) string {
	switch word {
	case "ug":
		return "microgram"
	case "unit":
		return "units"
	case "umol":
		return "micromol"
	}
	return word
}

// expiry reads 7003, else 17: a day without a time lasts to its end, and day 00
// stands for the last day of the month (GS1 General Specifications, 17).
func (c *Coded) expiry(has map[string]gs1.Found, now time.Time) {
	if e, ok := has["7003"]; ok {
		c.UseBy, _ = moment(e.Value, now) // it exists: gs1 has looked
		return
	}
	e, ok := has["17"]
	if !ok {
		return
	}
	c.WholeDay = true
	text := e.Value + "2359"
	if strings.HasSuffix(e.Value, "00") {
		c.WholeMonth = true
		text = e.Value[:4] + "012359"
	}
	c.UseBy, _ = moment(text, now)
	if c.WholeMonth {
		c.UseBy = c.UseBy.AddDate(0, 1, -1)
	}
}

// moment reads YYMMDDhhmm as a clock on the wall shows it.
func moment(digits string, now time.Time) (time.Time, error) {
	year := gs1.Year(int(digits[0]-'0')*10+int(digits[1]-'0'), now.Year())
	return time.Parse("200601021504", fmt.Sprintf("%04d%s", year, digits[2:]))
}
