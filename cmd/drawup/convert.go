package main

import (
	"fmt"
	"io"
	"math/big"
	"strings"

	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/dilution/salts"
)

func convertFlags() []flagSpec {
	return []flagSpec{
		{"from", "10 %", "what there is"},
		{"to", "mg/mL", "the unit wanted"},
		{"of", "magnesium sulfate heptahydrate", `the salt, where mass, mmol, mEq or base meet; "calcium in calcium chloride dihydrate" counts one ion`},
	}
}

// A convertDocument is the answer of drawup convert.
type convertDocument struct {
	From    string        `json:"from,omitempty"`
	Of      string        `json:"of,omitempty"`
	Result  *quantityJSON `json:"result,omitempty"`
	Working []string      `json:"working,omitempty"`
	findings
}

func runConvert(e env, args []string) int {
	r := newRequest("convert", convertFlags(), args)
	if r.help {
		return showHelp(e, "convert")
	}
	doc := &convertDocument{}
	r.need("from", "there is nothing to convert")
	r.need("to", "the unit wanted is not said")
	if !r.refused() {
		doc.From, doc.Of = r.texts["from"].text, r.texts["of"].text
		c := &conversion{r: r, doc: doc}
		c.work()
	}
	if r.refused() {
		doc.Result, doc.Working = nil, nil
	}
	return r.finish(e, doc, func(w io.Writer) { tellConvert(w, doc) })
}

func tellConvert(w io.Writer, d *convertDocument) {
	fmt.Fprintf(w, "%s\n", shown(d.Result))
	// A fraction that does not end could be read as two numbers: --json has it.
	if plain(d.Result.Printed) != d.Result.Exact && !strings.Contains(d.Result.Exact, "/") {
		line(w, "exactly", d.Result.Exact+" "+d.Result.Unit)
	}
	line(w, "from", oneLine(d.From))
	for _, s := range d.Working {
		line(w, "how", s)
	}
}

// A shape is what a text turned out to be.
type shape int

// Shapes of quantity that convert reads.
const (
	shapeNone shape = iota
	shapeAmount
	shapeVolume
	shapeConcentration
	shapeDose
	shapeDoseRate
	shapeFlow
	shapeWeight
	shapeHeight
	shapeSurface
	shapeDuration
	shapeFlowPerKilogram
)

func (s shape) String() string {
	switch s {
	case shapeAmount:
		return "an amount"
	case shapeVolume:
		return "a volume"
	case shapeConcentration:
		return "a concentration"
	case shapeDose:
		return "a dose"
	case shapeDoseRate:
		return "a dose rate"
	case shapeFlow:
		return "a flow rate"
	case shapeWeight:
		return "a body weight"
	case shapeHeight:
		return "a height"
	case shapeSurface:
		return "a surface area"
	case shapeDuration:
		return "a time"
	case shapeFlowPerKilogram:
		return "a flow rate per kg"
	case shapeNone:
		return "nothing"
	}
	return "nothing"
}

// A reading is a text read as one shape: its exact value in the base unit, how
// it counts drug and, for doses and rates, per what.
type reading struct {
	shape shape
	value *big.Rat
	kind  quantity.Kind
	basis quantity.Basis
	unit  string // plain name of the unit, "" where the text's own will do
	amt   quantity.Unit
}

// readAny reads text as the first shape that fits. Bare amounts win over doses.
func readAny(text string) (reading, bool) {
	if a, err := quantity.ParseAmount(text); err == nil {
		return reading{shape: shapeAmount, value: a.Rat(), kind: a.Kind(), unit: a.Unit().String(), amt: a.Unit()}, true
	}
	if v, err := quantity.ParseVolume(text); err == nil {
		return reading{shape: shapeVolume, value: v.Rat()}, true
	}
	if c, err := quantity.ParseConcentration(text); err == nil {
		return reading{shape: shapeConcentration, value: c.Rat(), kind: c.Kind(), amt: c.Unit()}, true
	}
	if d, err := quantity.ParseDose(text); err == nil {
		return reading{shape: shapeDose, value: d.Rat(), kind: d.Kind(), basis: d.Basis(), unit: d.Unit().String() + plainBasis(d.Basis())}, true
	}
	if d, err := quantity.ParseDoseRate(text); err == nil {
		return reading{shape: shapeDoseRate, value: d.Rat(), kind: d.Kind(), basis: d.Basis(), unit: doseRateUnit(d)}, true
	}
	if f, err := quantity.ParseFlowRate(text); err == nil {
		return reading{shape: shapeFlow, value: f.Rat()}, true
	}
	return readBody(text)
}

func readBody(text string) (reading, bool) {
	if w, err := quantity.ParseAnyBodyWeight(text); err == nil {
		return reading{shape: shapeWeight, value: w.Rat(), unit: "kg"}, true
	}
	if l, err := quantity.ParseAnyLength(text); err == nil {
		return reading{shape: shapeHeight, value: l.Rat()}, true
	}
	if a, err := quantity.ParseSurface(text); err == nil {
		return reading{shape: shapeSurface, value: a.Rat(), unit: "m2"}, true
	}
	if d, err := quantity.ParseDuration(text); err == nil {
		return reading{shape: shapeDuration, value: d.Rat()}, true
	}
	if f, err := quantity.ParseFlowPerKilogram(text); err == nil {
		return reading{shape: shapeFlowPerKilogram, value: f.Rat()}, true
	}
	return reading{}, false
}

// A conversion is one request of drawup convert being worked.
type conversion struct {
	r    *request
	doc  *convertDocument
	salt salts.Salt
	ok   bool // salt is set
}

func (c *conversion) work() {
	from, fromForm := form(c.doc.From)
	to, toForm := form(c.r.texts["to"].text)
	if !c.target(to) {
		return
	}
	one, ok := readAny("1 " + to)
	if !ok {
		c.refuse(refusal.UnitUnknown, "--to", to, "a unit such as mg, mmol/mL, mL/min or kg",
			fmt.Sprintf("--to: got %q, want a unit", to), "give the unit alone, without a number")
		return
	}
	if c.r.given("of") && !c.findSalt(c.doc.Of) {
		return
	}
	if charge, ok := milliequivalents(from); ok {
		c.fromCharge(charge, one, toForm, to)
		return
	}
	got, ok := readAny(from)
	if one.shape == shapeWeight && got.shape == shapeAmount && got.unit == "g" {
		got = reading{shape: shapeWeight, value: new(big.Rat).Quo(got.value, big.NewRat(1000000, 1)), unit: "kg"}
	}
	if !ok {
		c.unread(from, one.shape)
		return
	}
	c.join(got, one, fromForm, toForm, to)
}

// target refuses what is read but never written (rule R14).
func (c *conversion) target(to string) bool {
	switch {
	case to == "%" || to == "% w/v":
		c.refuse(refusal.UnitWrongKind, "--to", to, "mg/mL", "per cent is read, never written: it does not say which substance it counts",
			"ask for mg/mL; 1 % w/v is 10 mg/mL")
	case strings.HasPrefix(to, "mEq"):
		c.refuse(refusal.UnitWrongKind, "--to", to, "mmol", "milliequivalents are read, never written",
			"ask for mmol; mEq is mmol times the charge of the ion")
	case strings.HasPrefix(to, "1:") || strings.HasPrefix(to, "1 in"):
		c.refuse(refusal.RatioStrength, "--to", to, "mg/mL", "a ratio strength is read, never written", "ask for mg/mL or microgram/mL")
	case readOnly(to):
		c.refuse(refusal.UnitWrongKind, "--to", to, "kg or cm", "this unit is read, never written", "ask for kg or cm")
	default:
		return true
	}
	return false
}

// readOnly reports a unit of weight or height that is read and never written.
func readOnly(unit string) bool {
	switch unit {
	case "lb", "lbs", "pound", "pounds", "st", "stone", "stones", "in", "inch", "inches", "ft", "foot", "feet":
		return true
	}
	return false
}

func (c *conversion) refuse(code refusal.Code, field, got, want, message, remedy string) {
	rule := "R4"
	if field == "--to" {
		rule = "R14"
	}
	c.r.add(refusal.Reason{Code: code, Field: field, Got: got, Want: want, Message: message, Rule: rule, Remedy: remedy})
}

// unread tells why from cannot be read, in the words of the shape wanted.
func (c *conversion) unread(from string, want shape) {
	var err error
	switch want {
	case shapeVolume:
		_, err = quantity.ParseVolume(from)
	case shapeConcentration:
		_, err = quantity.ParseConcentration(from)
	case shapeDose:
		_, err = quantity.ParseDose(from)
	case shapeDoseRate:
		_, err = quantity.ParseDoseRate(from)
	case shapeFlow:
		_, err = quantity.ParseFlowRate(from)
	case shapeWeight:
		_, err = quantity.ParseAnyBodyWeight(from)
	case shapeHeight:
		_, err = quantity.ParseAnyLength(from)
	case shapeSurface:
		_, err = quantity.ParseSurface(from)
	case shapeDuration:
		_, err = quantity.ParseDuration(from)
	case shapeFlowPerKilogram:
		_, err = quantity.ParseFlowPerKilogram(from)
	case shapeAmount, shapeNone:
		_, err = quantity.ParseAmount(from)
	}
	if err == nil {
		err = &quantity.NotGivenError{What: "quantity to convert"}
	}
	c.r.add(faultOf("--from", err))
}

// form cuts the word "base" or "salt" from the end of a quantity. Some labels
// count the anhydrous salt or the cation instead of a base.
func form(text string) (rest, word string) {
	t := strings.TrimSpace(text)
	for _, w := range []string{"base", "anhydrous", "cation", "salt"} {
		s, ok := strings.CutSuffix(t, " "+w)
		switch {
		case ok && w == "salt":
			return strings.TrimSpace(s), w
		case ok:
			return strings.TrimSpace(s), "base"
		}
	}
	return t, ""
}

// join turns got into the unit of one.
func (c *conversion) join(got, one reading, fromForm, toForm, to string) {
	if got.shape != one.shape {
		c.unlike(got, one)
		return
	}
	if got.basis != one.basis {
		c.r.add(faultOf("--to", &quantity.BasisError{Got: one.basis, Want: got.basis}))
		return
	}
	forms := fromForm != toForm && (fromForm == "base" || toForm == "base")
	if got.kind != one.kind || forms {
		c.throughSalt(got, one, fromForm, toForm, to)
		return
	}
	c.r.forbid("both sides count the same thing", "of")
	c.answer(got.value, one, to)
}

// unlike refuses a change of shape and says what would be needed.
func (c *conversion) unlike(got, one reading) {
	remedy := "check both units"
	switch {
	case got.shape == shapeVolume && one.shape == shapeAmount, got.shape == shapeAmount && one.shape == shapeVolume:
		remedy = "a concentration joins them: use drawup dose or drawup mix"
	case got.shape == shapeFlow && one.shape == shapeDoseRate, got.shape == shapeDoseRate && one.shape == shapeFlow:
		remedy = "a concentration joins them: use drawup rate"
	case got.shape == shapeWeight || one.shape == shapeWeight:
		remedy = "a body weight is no amount of drug (rule R3)"
	}
	c.refuse(refusal.UnitWrongKind, "--from", c.doc.From, one.shape.String(),
		fmt.Sprintf("got %v, want %v", got.shape, one.shape), remedy)
}

// answer puts value, counted in the base unit, into the document in the unit
// of one.
func (c *conversion) answer(value *big.Rat, one reading, to string) {
	x := new(big.Rat).Quo(value, one.value)
	unit := to
	if one.unit != "" {
		unit = one.unit
	}
	c.doc.Result = &quantityJSON{exactText(x), c.printed(x, one, to, unit), unit}
}

// printed is x of the unit to in the house style, where the style knows it.
func (c *conversion) printed(x *big.Rat, one reading, to, unit string) string {
	s := c.r.style
	switch one.shape {
	case shapeAmount:
		return s.AmountIn(quantity.AmountOf(x, one.amt), one.amt)
	case shapeConcentration:
		perMillilitre, err := quantity.AmountOf(x, one.amt).In(quantity.Millilitres(big.NewRat(1, 1)))
		if err == nil && strings.HasSuffix(strings.ToLower(to), "/ml") && !strings.ContainsAny(to, "0123456789") {
			return s.ConcentrationIn(perMillilitre, one.amt)
		}
	case shapeDose:
		if d, err := quantity.ParseDose("1 " + to); err == nil {
			return s.Dose(d.Scaled(x))
		}
	case shapeDoseRate:
		if d, err := quantity.ParseDoseRate("1 " + to); err == nil {
			return s.DoseRate(d.Scaled(x))
		}
	case shapeNone, shapeVolume, shapeFlow, shapeWeight, shapeHeight, shapeSurface, shapeDuration, shapeFlowPerKilogram:
	}
	return s.Number(x) + " " + unit
}
