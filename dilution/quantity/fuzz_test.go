package quantity

import (
	"regexp"
	"strings"
	"testing"
)

// A readBack is what one parser made of a text: the same value in words that
// must read again, and whether it reads to the same.
type readBack struct {
	words string
	same  func(words string) bool
}

type reader func(string) (readBack, error)

// readers give the read-back of a text, or the error.
func readers() map[string]reader {
	all := drugReaders()
	for name, r := range bodyReaders() {
		all[name] = r
	}
	for name, r := range timeReaders() {
		all[name] = r
	}
	return all
}

func timeReaders() map[string]reader {
	return map[string]reader{
		"any weight": func(s string) (readBack, error) {
			v, err := ParseAnyBodyWeight(s)
			return readBack{v.Exact() + " kg", func(w string) bool { b, err := ParseAnyBodyWeight(w); return err == nil && b.Cmp(v) == 0 }}, err
		},
		"any height": func(s string) (readBack, error) {
			l, err := ParseAnyLength(s)
			return readBack{l.Exact() + " cm", func(w string) bool { b, err := ParseAnyLength(w); return err == nil && b.Cmp(l) == 0 }}, err
		},
		"duration": func(s string) (readBack, error) {
			d, err := ParseDuration(s)
			return readBack{d.Exact() + " min", func(w string) bool { b, err := ParseDuration(w); return err == nil && b.Rat().Cmp(d.Rat()) == 0 }}, err
		},
		"drop factor": func(s string) (readBack, error) {
			n, err := ParseDropFactor(s)
			return readBack{n.Exact() + " drops/mL", func(w string) bool { b, err := ParseDropFactor(w); return err == nil && b.Rat().Cmp(n.Rat()) == 0 }}, err
		},
		"drop rate": func(s string) (readBack, error) {
			d, err := ParseDropRate(s)
			return readBack{d.Exact() + " drops/min", func(w string) bool { b, err := ParseDropRate(w); return err == nil && b.Rat().Cmp(d.Rat()) == 0 }}, err
		},
		"flow per kg": func(s string) (readBack, error) {
			f, err := ParseFlowPerKilogram(s)
			return readBack{f.x.text() + " mL/kg/h", func(w string) bool {
				b, err := ParseFlowPerKilogram(w)
				return err == nil && b.Rat().Cmp(f.Rat()) == 0
			}}, err
		},
	}
}

func drugReaders() map[string]reader {
	return map[string]reader{
		"amount": func(s string) (readBack, error) {
			a, err := ParseAmount(s)
			return readBack{a.Exact(a.Unit()) + " " + a.Unit().String(), func(w string) bool {
				b, err := ParseAmount(w)
				return err == nil && b.Equal(a) && b.Unit().String() == a.Unit().String()
			}}, err
		},
		"volume": func(s string) (readBack, error) {
			v, err := ParseVolume(s)
			return readBack{v.Exact() + " mL", func(w string) bool { b, err := ParseVolume(w); return err == nil && b.Cmp(v) == 0 }}, err
		},
		"concentration": func(s string) (readBack, error) {
			c, err := ParseConcentration(s)
			return readBack{c.Exact(c.Unit()) + " " + c.Unit().String() + "/mL", func(w string) bool { b, err := ParseConcentration(w); return err == nil && b.Equal(c) }}, err
		},
		"mix": func(s string) (readBack, error) {
			a, v, err := ParseMix(s)
			return readBack{a.Exact(a.Unit()) + " " + a.Unit().String() + " in " + v.Exact() + " mL", func(w string) bool {
				b, x, err := ParseMix(w)
				return err == nil && b.Equal(a) && x.Cmp(v) == 0
			}}, err
		},
		"dose": func(s string) (readBack, error) {
			d, err := ParseDose(s)
			return readBack{d.Exact() + " " + d.Unit().String() + basisTail(d.Basis()), func(w string) bool {
				b, err := ParseDose(w)
				n, err2 := b.Cmp(d)
				return err == nil && err2 == nil && n == 0
			}}, err
		},
		"dose rate": func(s string) (readBack, error) {
			d, err := ParseDoseRate(s)
			return readBack{d.Exact() + " " + d.Unit().String() + basisTail(d.Basis()) + "/" + d.Period().String(), func(w string) bool {
				b, err := ParseDoseRate(w)
				n, err2 := b.Cmp(d)
				return err == nil && err2 == nil && n == 0
			}}, err
		},
		"flow rate": func(s string) (readBack, error) {
			f, err := ParseFlowRate(s)
			return readBack{f.Exact() + " mL/h", func(w string) bool { b, err := ParseFlowRate(w); return err == nil && b.Cmp(f) == 0 }}, err
		},
	}
}

func bodyReaders() map[string]reader {
	return map[string]reader{
		"weight": func(s string) (readBack, error) {
			v, err := ParseBodyWeight(s)
			return readBack{v.Exact() + " kg", func(w string) bool { b, err := ParseBodyWeight(w); return err == nil && b.Cmp(v) == 0 }}, err
		},
		"height": func(s string) (readBack, error) {
			l, err := ParseLength(s)
			return readBack{l.Exact() + " cm", func(w string) bool { b, err := ParseLength(w); return err == nil && b.Cmp(l) == 0 }}, err
		},
		"surface": func(s string) (readBack, error) {
			v, err := ParseSurface(s)
			return readBack{v.Exact() + " m2", func(w string) bool { b, err := ParseSurface(w); return err == nil && b.Rat().Cmp(v.Rat()) == 0 }}, err
		},
		"percent": func(s string) (readBack, error) {
			p, err := ParsePercent(s)
			return readBack{p.Exact() + " %", func(w string) bool { b, err := ParsePercent(w); return err == nil && b.Rat().Cmp(p.Rat()) == 0 }}, err
		},
	}
}

// accepted is the strict shape of a number that the manual promises.
var accepted = regexp.MustCompile(`^\s*(?:0|[1-9][0-9]*)(?:\.[0-9]+)?[^0-9.,]`)

// unreadable is an exact value that is right and still no input: a fraction, or
// more characters than a number may have.
var unreadable = regexp.MustCompile(`^[0-9]+/|[0-9.]{16,}`)

var trailingZero = regexp.MustCompile(`\.[0-9]*0(?:[^0-9]|$)`)

// FuzzParse: whatever is accepted began with a plain number and, written out
// exactly, reads back as the same; whatever is refused says so as a
// *SyntaxError whose likely reading reads. Texts longer than a number may be
// (a fraction, a litre in mL) are passed over only for the reading back.
func FuzzParse(f *testing.F) {
	for _, s := range []string{"4 mg", "0.1 microgram/kg/min", "75 mg/m2", "4 mg in 50 mL", "1:1000", "1 in 1,000", "0.5 %", "5 mL/h", "72 kg", "72 lb", "11 stone 4 pounds", "11 st 4", "5 feet 7 inches", `5'7"`, "1 h 30 min", "6:30", "1.0d0", "20 drops/mL", "42 gtt/min", "2 mL/kg/h", "1.78 m", "1.8 m²", "10 %",
		"1,5 mg", ".5 mg", "-5 mg", "5 / mg", "5 /", "5 //", "1e3 mg", "½ mg", "1/2 mL", "1 1/2 mL", "1 000 mg", "5 mg/100 mL", "5 mg/0 mL", "50 IU/mL", "1:", "1 in ", " in ", "5 per mL", "٥ mg", "0x10 mg", "5\u00a0mg", "5 mg/1,000 mL", "\xff"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, s string) {
		for name, read := range readers() {
			got, err := read(s)
			if err != nil {
				fault := faultIn(t, s, err)
				if fault.Code == "" || fault.Why == "" || fault.Want == "" || fault.Got != s {
					t.Fatalf("%s %q: half a fault: %+v", name, s, fault)
				}
				if fault.Likely == "" {
					continue
				}
				if _, err := read(fault.Likely); err != nil || trailingZero.MatchString(fault.Likely) {
					t.Fatalf("%s %q: likely %q, which gives %v", name, s, fault.Likely, err)
				}
				continue
			}
			if !accepted.MatchString(strings.Join(strings.Fields(s), " ") + " ") {
				t.Fatalf("%s %q: accepted", name, s)
			}
			if !unreadable.MatchString(got.words) && !got.same(got.words) {
				t.Fatalf("%s %q: %q does not read back as the same", name, s, got.words)
			}
		}
	})
}
