package labels_test

import (
	"fmt"
	"math"
	"testing"

	"drawup/labels"
)

// This file looks at the class colours as a colour-deficient reader does.
//
// Simulation: Viénot, Brettel and Mollon 1999 (Color Res Appl) for readers
// without the red or the green receptor, Brettel, Viénot and Mollon 1997 (J Opt
// Soc Am A) for those without the blue one, with the constants for sRGB of a
// public-domain implementation. Distance: CIEDE2000 (CIE 142-2001). Under 10 a
// pair counts as confusable, under 15 as one for caution: bands of our own.

type vec [3]float64

// linear is a colour in linear sRGB.
func linear(c labels.RGB) vec {
	part := func(v uint8) float64 { return luminance(labels.RGB{R: v, G: v, B: v}) }
	return vec{part(c.R), part(c.G), part(c.B)}
}

type matrix [3]vec

func (m matrix) of(v vec) vec {
	var out vec
	for i, row := range m {
		out[i] = row[0]*v[0] + row[1]*v[1] + row[2]*v[2]
	}
	return out
}

// A sight is how somebody sees a colour, in linear sRGB.
type sight struct {
	name string
	sees func(vec) vec
}

func sights() []sight {
	protan := matrix{{0.11238, 0.88762, 0}, {0.11238, 0.88762, 0}, {0.00401, -0.00401, 1}}
	deutan := matrix{{0.29275, 0.70725, 0}, {0.29275, 0.70725, 0}, {-0.02234, 0.02234, 1}}
	tritan1 := matrix{{1.01277, 0.13548, -0.14826}, {-0.01243, 0.86812, 0.14431}, {0.07589, 0.80500, 0.11911}}
	tritan2 := matrix{{0.93678, 0.18979, -0.12657}, {0.06154, 0.81526, 0.12320}, {-0.37562, 1.12767, 0.24796}}
	screen := func(see func(vec) vec) func(vec) vec {
		return func(v vec) vec { return shown(see(v)) }
	}
	return []sight{
		{"normal", func(v vec) vec { return v }},
		{"protan", screen(protan.of)},
		{"deutan", screen(deutan.of)},
		{"tritan", screen(func(v vec) vec {
			if 0.03901*v[0]-0.02788*v[1]-0.01113*v[2] >= 0 {
				return tritan1.of(v)
			}
			return tritan2.of(v)
		})},
	}
}

// shown is a colour as a screen of 8 bits shows it.
func shown(v vec) vec {
	var out vec
	for i, x := range v {
		x = min(max(x, 0), 1)
		if x <= 0.0031308 {
			x *= 12.92
		} else {
			x = 1.055*math.Pow(x, 1/2.4) - 0.055
		}
		n := uint8(math.Round(x * 255))
		out[i] = luminance(labels.RGB{R: n, G: n, B: n})
	}
	return out
}

// lab is a colour in CIE Lab under D65, clipped to what a screen shows.
func lab(v vec) vec {
	for i := range v {
		v[i] = min(max(v[i], 0), 1)
	}
	xyz := matrix{{0.4124564, 0.3575761, 0.1804375}, {0.2126729, 0.7151522, 0.0721750}, {0.0193339, 0.1191920, 0.9503041}}.of(v)
	f := func(t float64) float64 {
		if t > 216.0/24389 {
			return math.Cbrt(t)
		}
		return (24389.0/27*t + 16) / 116
	}
	x, y, z := f(xyz[0]/0.95047), f(xyz[1]), f(xyz[2]/1.08883)
	return vec{116*y - 16, 500 * (x - y), 200 * (y - z)}
}

// distance is CIEDE2000 between two Lab colours.
func distance(p, q vec) float64 {
	deg := func(x float64) float64 { return x * math.Pi / 180 }
	c7 := math.Pow((math.Hypot(p[1], p[2])+math.Hypot(q[1], q[2]))/2, 7)
	g := 0.5 * (1 - math.Sqrt(c7/(c7+math.Pow(25, 7))))
	hue := func(b, a float64) float64 {
		if a == 0 && b == 0 {
			return 0
		}
		return math.Mod(math.Atan2(b, a)*180/math.Pi+360, 360)
	}
	a1, a2 := (1+g)*p[1], (1+g)*q[1]
	c1, c2 := math.Hypot(a1, p[2]), math.Hypot(a2, q[2])
	h1, h2 := hue(p[2], a1), hue(q[2], a2)
	dh, sum := h2-h1, h1+h2
	mean := sum / 2
	switch {
	case c1*c2 == 0:
		dh, mean = 0, sum
	case math.Abs(dh) > 180 && sum < 360:
		dh, mean = dh-math.Copysign(360, dh), (sum+360)/2
	case math.Abs(dh) > 180:
		dh, mean = dh-math.Copysign(360, dh), (sum-360)/2
	}
	dl, dc := q[0]-p[0], c2-c1
	big := 2 * math.Sqrt(c1*c2) * math.Sin(deg(dh/2))
	l, c := (p[0]+q[0])/2, (c1+c2)/2
	t := 1 - 0.17*math.Cos(deg(mean-30)) + 0.24*math.Cos(deg(2*mean)) + 0.32*math.Cos(deg(3*mean+6)) - 0.20*math.Cos(deg(4*mean-63))
	sl := 1 + 0.015*(l-50)*(l-50)/math.Sqrt(20+(l-50)*(l-50))
	sc, sh := 1+0.045*c, 1+0.015*c*t
	rc := 2 * math.Sqrt(math.Pow(c, 7)/(math.Pow(c, 7)+math.Pow(25, 7)))
	rt := -math.Sin(deg(60*math.Exp(-math.Pow((mean-275)/25, 2)))) * rc
	return math.Sqrt(math.Pow(dl/sl, 2) + math.Pow(dc/sc, 2) + math.Pow(big/sh, 2) + rt*dc/sc*big/sh)
}

// Pairs of the test data published with CIEDE2000 (Sharma, Wu and Dalal 2005,
// table 1, rows 1, 4, 7, 17, 25 and 34).
func TestDistance(t *testing.T) {
	for _, c := range []struct {
		p, q vec
		want float64
	}{
		{vec{50, 2.6772, -79.7751}, vec{50, 0, -82.7485}, 2.0425},
		{vec{50, -1.3802, -84.2814}, vec{50, 0, -82.7485}, 1.0000},
		{vec{50, 0, 0}, vec{50, -1, 2}, 2.3669},
		{vec{50, 2.5, 0}, vec{73, 25, -18}, 27.1492},
		{vec{60.2574, -34.0099, 36.2677}, vec{60.4626, -34.1751, 39.4387}, 1.2644},
		{vec{2.0776, 0.0795, -1.1350}, vec{0.9033, -0.0636, -0.5514}, 0.9082},
	} {
		if got := distance(c.p, c.q); math.Abs(got-c.want) > 0.00006 {
			t.Errorf("%v %v: got %.4f, want %.4f", c.p, c.q, got, c.want)
		}
	}
}

// The distances of the label rules, table 1.11, which were worked once with
// another program from the same papers: normal, protan, deutan, tritan.
func TestConfusableColours(t *testing.T) {
	for pair, want := range map[[2]string][4]float64{
		{"ACH", "AEM"}: {27.0, 7.2, 3.6, 29.9}, {"OPI", "VAS"}: {33.4, 4.6, 10.1, 33.7}, {"BZD", "ACH"}: {46.2, 16.4, 8.3, 35.4},
		{"BZD", "NMB"}: {22.7, 18.8, 9.1, 10.3}, {"VAS", "LA"}: {20.6, 19.4, 18.8, 8.3}, {"IND", "ACH"}: {19.3, 10.2, 13.0, 25.1},
		{"IND", "VAS"}: {50.8, 47.1, 45.2, 9.6}, {"IND", "AEM"}: {21.0, 16.9, 14.6, 10.4}, {"BZD", "AEM"}: {18.1, 15.8, 11.6, 15.0},
		{"OPI", "ACH"}: {44.9, 47.2, 50.4, 12.5}, {"VAS", "AEM"}: {33.6, 36.0, 35.9, 13.4}, {"NMB", "ACH"}: {65.0, 32.1, 14.0, 42.1},
		{"IND", "OTH"}: {30.3, 30.4, 30.4, 14.3}, {"VAS", "OTH"}: {19.8, 17.4, 15.9, 14.4},
	} {
		a, _ := labels.ClassOf(pair[0])
		b, _ := labels.ClassOf(pair[1])
		for i, s := range sights() {
			if got := distance(lab(s.sees(linear(a.Fill))), lab(s.sees(linear(b.Fill)))); math.Abs(got-want[i]) > 0.06 {
				t.Errorf("%v, %s: got %.2f, want %.1f", pair, s.name, got, want[i])
			}
		}
	}
}

// looks is what is left of a class's design without any colour.
func looks(c labels.Class) string {
	return fmt.Sprintf("stripes %v, bar %v, line %v", c.Stripes, c.Bar, c.Line)
}

// Rule R16: colour is never the only cue. Every pair of classes that some eye
// may take for one another differs in its printed word, or, where two classes
// are one kind of drug and share the word, in its shape. So does every pair on
// a printer without colours, where violet, green and salmon are one grey.
func TestWordRescuesEveryPair(t *testing.T) {
	for _, edition := range labels.Editions() {
		for _, region := range append(labels.Regions(), "") {
			scheme, ok := labels.SchemeOf(edition, region)
			if !ok {
				t.Fatalf("no scheme %s %s", edition, region)
			}
			list, rescued := scheme.Classes(), 0
			for i, a := range list {
				for _, b := range list[i+1:] {
					least := math.Inf(1)
					for _, s := range sights() {
						least = min(least, distance(lab(s.sees(linear(a.Background()))), lab(s.sees(linear(b.Background())))))
					}
					if least < 15 {
						rescued++
					}
					if a.Word == b.Word && looks(a) == looks(b) {
						t.Errorf("%s %s: %s and %s have one word and one shape, their colours are %.1f apart", edition, region, a.Code, b.Code, least)
					}
				}
			}
			if rescued < 20 {
				t.Errorf("got %d pairs that need the word, want the pairs of the table and more", rescued)
			}
		}
	}
}

// Contrast of black on each colour by WCAG 2.1, and as three kinds of
// colour-deficient readers see it: table 1.10 of the label rules.
func TestContrastTable(t *testing.T) {
	for code, want := range map[string][4]float64{
		"IND": {17.37, 17.0, 17.5, 16.7}, "BZD": {8.45, 6.75, 9.4, 8.2}, "NMB": {5.87, 3.96, 6.9, 5.9}, "OPI": {10.85, 11.7, 10.4, 10.9},
		"VAS": {12.36, 12.1, 12.5, 12.4}, "LA": {9.01, 9.0, 9.1, 9.0}, "ACH": {12.36, 13.0, 12.0, 12.3}, "AEM": {12.33, 11.5, 12.7, 12.3}, "OTH": {21, 21, 21, 21},
	} {
		c, _ := labels.ClassOf(code)
		for i, s := range sights() {
			v := s.sees(linear(c.Fill))
			y := 0.2126*v[0] + 0.7152*v[1] + 0.0722*v[2]
			allowed := 0.06
			if i == 0 {
				allowed = 0.006
			}
			if got := (y + 0.05) / 0.05; math.Abs(got-want[i]) > allowed {
				t.Errorf("%s, %s: got %.3f, want %.2f", code, s.name, got, want[i])
			}
		}
	}
}

// WCAG 2.1, 1.4.3: black type keeps 4.5 to 1 on every background of every
// scheme; white type on none, so that it stands in a black bar and nowhere else,
// where it has 7 to 1 and more.
func TestContrastOfEveryScheme(t *testing.T) {
	for _, edition := range labels.Editions() {
		for _, region := range append(labels.Regions(), "") {
			scheme, _ := labels.SchemeOf(edition, region)
			for _, c := range scheme.Classes() {
				black, white := contrast(labels.RGB{}, c.Background()), contrast(labels.RGB{R: 255, G: 255, B: 255}, c.Background())
				if black < 4.5 || white >= 4.5 {
					t.Errorf("%s %s %s: got %.2f for black, %.2f for white", edition, region, c.Code, black, white)
				}
				if c.Bar && contrast(c.LetterOnBar, labels.RGB{}) < 7 {
					t.Errorf("%s %s %s: got %.2f in the bar", edition, region, c.Code, contrast(c.LetterOnBar, labels.RGB{}))
				}
			}
		}
	}
}
