package quantity

import (
	"math/big"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// TestFormatting: the forms that the lists of error-prone dose designations ask
// for. uk: British National Formulary, prescription writing (microgram in full,
// under 1 mg in micrograms, under 1 g in mg). us: ISMP list (mcg). Commas from
// 1,000 on: ISMP. si: ISO drafting rules (a fixed blank groups the digits).
func TestFormatting(t *testing.T) {
	for _, c := range []struct{ in, uk, us string }{
		{"0.00005 g/mL", "50 micrograms/mL", "50 mcg/mL"},
		{"1.0 mg/mL", "1 mg/mL", "1 mg/mL"},
		{"0.1 mg/mL", "100 micrograms/mL", "100 mcg/mL"},
		{"0.16 mg/mL", "160 micrograms/mL", "160 mcg/mL"},
		{"1 unit/mL", "1 unit/mL", "1 unit/mL"},
		{"2 %", "20 mg/mL", "20 mg/mL"},
		{"1:200 000", "5 micrograms/mL", "5 mcg/mL"},
		{"4 mg in 50 mL", "80 micrograms/mL", "80 mcg/mL"},
		{"5000 units in 50 mL", "100 units/mL", "100 units/mL"},
		{"0.01 mg/mL", "10 micrograms/mL", "10 mcg/mL"},
		{"0.001 mg/mL", "1 microgram/mL", "1 mcg/mL"},
		{"0.0000005 mg/mL", "0.5 nanogram/mL", "0.5 nanogram/mL"},
		{"2 g/mL", "2,000 mg/mL", "2,000 mg/mL"}, {"0.5 mmol/mL", "0.5 mmol/mL", "0.5 mmol/mL"}, {"5 micromol/mL", "5 micromol/mL", "5 micromol/mL"},
	} {
		conc, err := ParseConcentration(c.in)
		if err != nil {
			t.Errorf("%s: %v", c.in, err)
			continue
		}
		if uk, us := UK().Concentration(conc), US().Concentration(conc); uk != c.uk || us != c.us {
			t.Errorf("%s: got %q, %q, want %q, %q", c.in, uk, us, c.uk, c.us)
		}
	}
	for _, c := range []struct{ in, uk, us, si string }{
		{"5000 units", "5,000 units", "5,000 units", "5\u00a0000 units"},
		{"10000 units", "10,000 units", "10,000 units", "10\u00a0000 units"},
		{"1000000 units", "1,000,000 units", "1,000,000 units", "1\u00a0000\u00a0000 units"},
		{"999 units", "999 units", "999 units", "999 units"},
		{"0.5 g", "500 mg", "500 mg", "500 mg"}, {"1000 mg", "1 g", "1 g", "1 g"}, {"1500 mg", "1.5 g", "1.5 g", "1.5 g"},
		{"0.05 mg", "50 micrograms", "50 mcg", "50 micrograms"}, {"0.0005 mg", "500 nanograms", "500 nanograms", "500 nanograms"},
		{"1 \u00b5g", "1 microgram", "1 mcg", "1 microgram"}, {"2.50 mg", "2.5 mg", "2.5 mg", "2.5 mg"},
	} {
		a, err := ParseAmount(c.in)
		if err != nil {
			t.Errorf("%s: %v", c.in, err)
			continue
		}
		if uk, us, si := UK().Amount(a), US().Amount(a), SI().Amount(a); uk != c.uk || us != c.us || si != c.si {
			t.Errorf("%s: got %q, %q, %q, want %q, %q, %q", c.in, uk, us, si, c.uk, c.us, c.si)
		}
	}
}

// TestRatesAndSizesPrint: the unit as ordered, per kg or m², hour as h.
func TestRatesAndSizesPrint(t *testing.T) {
	for in, want := range map[string]string{
		"0.1 mcg/kg/min": "0.1 microgram/kg/min", "10 ng/kg/min": "10 nanograms/kg/min", "5 mg/hr": "5 mg/h", "2 g/m2/day": "2 g/m²/day",
		"1.5 units/hour": "1.5 units/h", "2 milliunits/min": "2 milliunits/min", "1 unit/kg/h": "1 unit/kg/h",
	} {
		if d, err := ParseDoseRate(in); err != nil || UK().DoseRate(d) != want {
			t.Errorf("%s: got %q, %v, want %q", in, UK().DoseRate(d), err, want)
		}
	}
	for in, want := range map[string]string{"0.3 mg/kg": "0.3 mg/kg", "75 mg/m2": "75 mg/m²", "1500 units": "1,500 units"} {
		if d, err := ParseDose(in); err != nil || UK().Dose(d) != want {
			t.Errorf("%s: got %q, %v, want %q", in, UK().Dose(d), err, want)
		}
	}
	w, s, l, p := Kilograms(big.NewRat(725, 10)), SquareMetres(big.NewRat(18, 10)), Centimetres(big.NewRat(178, 1)), PerCent(big.NewRat(-1234567, 100))
	if got := strings.Join([]string{UK().BodyWeight(w), UK().Surface(s), UK().Length(l), UK().Percent(p), US().Number(big.NewRat(-1, 3))}, "; "); got != "72.5 kg; 1.8 m²; 178 cm; -12,346 %; -0.333" {
		t.Errorf("got %s", got)
	}
}

// TestShort: the rule by hand. Exact up to four significant digits, else three,
// half up, or a whole number from 1,000 on.
func TestShort(t *testing.T) {
	for in, want := range map[string]string{
		"0": "0", "1": "1", "0.0405": "0.0405", "0.01234": "0.01234", "0.012345": "0.0123", "0.0012355": "0.00124",
		"1/3": "0.333", "2/3": "0.667", "28/3": "9.33", "200/3": "66.7", "2000/3": "667", "20000/3": "6,667",
		"999.5": "999.5", "999.95": "1,000", "999.49": "999", "999.51": "1,000", "99.995": "100", "99.994": "100", "99.949": "99.9", "9.9995": "10", "0.99995": "1", "0.099996": "0.1",
		"1234": "1,234", "12345.6": "12,346", "12345": "12,345", "1000.4": "1,000", "1000.5": "1,001", "123456789": "123,456,789", "1000000": "1,000,000",
		"12.345": "12.3", "12.35": "12.35", "10.125": "10.1", "40.55": "40.55", "1.2345": "1.23", "1.2350001": "1.24", "100.05": "100",
		"-0.012345": "-0.0123", "-999.95": "-1,000", "-12345.6": "-12,346", "-123": "-123",
	} {
		if got := UK().Number(rat(t, in)); got != want {
			t.Errorf("%s: got %q, want %q", in, got, want)
		}
	}
}

// TestScalePrint: what a scale or a pump shows, two decimals or fewer, is never
// shortened; the rest goes by the SHORT rule.
func TestScalePrint(t *testing.T) {
	for in, want := range map[string]string{"12.345": "12.3 mL", "123.45": "123.45 mL", "2296.8": "2,296.8 mL", "1/3": "0.333 mL", "0.05": "0.05 mL", "0.0405": "0.0405 mL", "1000": "1,000 mL"} {
		if got := UK().Volume(Millilitres(rat(t, in))); got != want {
			t.Errorf("%s: got %q, want %q", in, got, want)
		}
		if got := UK().FlowRate(MillilitresPerHour(rat(t, in))); got != want+"/h" {
			t.Errorf("%s: got %q, want %q", in, got, want+"/h")
		}
	}
}

// TestShortProperty states the rule another way, over plain fractions: the
// print p of x is x itself if x is a whole number of steps of a thousandth of
// its own decade; else p is on its step and -step/2 <= x - p < step/2.
func TestShortProperty(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		x := aRat().Draw(t, "x")
		p, ok := new(big.Rat).SetString(strings.ReplaceAll(US().Number(x), ",", ""))
		if !ok {
			t.Fatalf("%v prints %q", x, US().Number(x))
		}
		decade := big.NewRat(1, 1)
		ten := big.NewRat(10, 1)
		for x.Cmp(decade) < 0 {
			decade = quoRat(decade, ten)
		}
		for x.Cmp(mulRat(decade, ten)) >= 0 {
			decade = mulRat(decade, ten)
		}
		if quoRat(x, quoRat(decade, big.NewRat(1000, 1))).IsInt() {
			if p.Cmp(x) != 0 {
				t.Fatalf("%v: printed %v, want it exact", x, p)
			}
			return
		}
		step := quoRat(decade, big.NewRat(100, 1))
		if x.Cmp(big.NewRat(1000, 1)) >= 0 {
			step = big.NewRat(1, 1)
		}
		off := quoRat(new(big.Rat).Sub(x, p), step)
		if !quoRat(p, step).IsInt() || off.Cmp(big.NewRat(-1, 2)) < 0 || off.Cmp(big.NewRat(1, 2)) >= 0 {
			t.Fatalf("%v: printed %v, off by %v steps of %v", x, p, off, step)
		}
	})
}

// TestExactText: a decimal if it ends, else lowest terms.
func TestExactText(t *testing.T) {
	for in, want := range map[string]string{"28/3": "28/3", "56/6": "28/3", "1/8": "0.125", "10": "10", "1/1024": "0.0009765625", "100": "100", "5/2": "2.5", "0": "0"} {
		if got := Millilitres(rat(t, in)).Exact(); got != want {
			t.Errorf("%s: got %q, want %q", in, got, want)
		}
	}
	a := AmountOf(big.NewRat(1, 3), Milligram())
	if got := a.Exact(Microgram()); got != "1000/3" {
		t.Errorf("a third of a mg: got %q micrograms, want 1000/3", got)
	}
	d, err := ParseDoseRate("0.1 microgram/kg/min")
	if err != nil || d.Exact() != "0.1" || d.Rat().Cmp(rat(t, "6/1000")) != 0 {
		t.Errorf("0.1 microgram/kg/min: got %q, %v mg/kg/h, %v", d.Exact(), d.Rat(), err)
	}
}

// TestInCode: ASCII, no blank, no group sign.
func TestInCode(t *testing.T) {
	for in, want := range map[string]string{"0.05 mg/mL": "50ug/mL", "1 mg/mL": "1mg/mL", "0.0005 \u00b5g/mL": "0.5ng/mL", "100 units/mL": "100unit/mL", "2000 units/mL": "2000unit/mL", "0.5 mmol/mL": "0.5mmol/mL", "2 mmol/mL": "2mmol/mL", "1 mg in 3 mL": "333ug/mL"} {
		if c, err := ParseConcentration(in); err != nil || c.InCode() != want {
			t.Errorf("%s: got %q, %v, want %q", in, c.InCode(), err, want)
		}
	}
}

// Amounts in the code are the printed ones: unit words of ASCII letters, no
// blank, no group sign.
func TestAmountInCode(t *testing.T) {
	for in, want := range map[string]string{"5 g": "5g", "1000 mg": "1g", "20 mg": "20mg", "0.05 mg": "50ug", "0.0005 mg": "500ng", "5000 units": "5000unit", "8 mmol": "8mmol", "0.5 mmol": "0.5mmol", "1234.5 mg": "1.23g"} {
		if a, err := ParseAmount(in); err != nil || a.InCode() != want {
			t.Errorf("%s: got %q, %v, want %q", in, a.InCode(), err, want)
		}
	}
	if got := (Amount{}).InCode(); got != "" {
		t.Errorf("nothing: got %q", got)
	}
}

// TestStyles: names, and the zero style that prints nothing.
func TestStyles(t *testing.T) {
	for _, s := range styles() {
		if got, ok := StyleNamed(s.String()); !ok || got != s {
			t.Errorf("%q: got %q, %v", s, got, ok)
		}
	}
	for _, name := range []string{"", "UK", "de", "uk "} {
		if s, ok := StyleNamed(name); ok || s != (Style{}) {
			t.Errorf("%q: got %q, want none", name, s)
		}
	}
	var none Style
	one := big.NewRat(1, 1)
	if got := none.Amount(AmountOf(one, Gram())) + none.Volume(Millilitres(one)) + none.Number(one) + none.Percent(PerCent(one)); got != "" {
		t.Errorf("no style prints %q", got)
	}
}
