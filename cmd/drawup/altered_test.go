package main

import (
	"fmt"
	"math/big"
	"regexp"
	"strings"
	"sync/atomic"
	"testing"
	"unicode"

	"drawup/dilution/formulary"
	"drawup/dilution/recheck"
)

const demo = "../../testdata/orders/harbour-morning.toml"

// demoJob is the demonstration list, worked and passed.
func demoJob(t testing.TB) *job { return jobOf(t, demo) }

// jobOf is the list of an order file, worked with the given flags and passed.
func jobOf(t testing.TB, file string, args ...string) *job {
	t.Helper()
	f, err := formulary.Default()
	if err != nil {
		t.Fatal(err)
	}
	flags, faults := readPaperFlags("prepare", args)
	lib := library{form: f}
	if faults = append(faults, flags.takeShelf(&lib)...); faults.Refused() {
		t.Fatal(faults)
	}
	j, reasons := newJob(file, lib, flags.when(nil), nil, silent)
	if reasons.Refused() {
		t.Fatalf("the demonstration list is refused:\n%v", reasons.Refusals())
	}
	return j
}

// TestAlteredFigures alters every printed figure of the whole demonstration
// list, on one paper and on all papers at once, and demands that the second
// route stops each (rule R17; the list: last digit, ×10, ÷10, ×60, mg
// for microgram and its like).
func TestAlteredFigures(t *testing.T) {
	alterList(t, demoJob(t), 10000)
}

// TestAlteredFiguresFromShelf does the same with the list that is planned from the
// demonstration shelf: several sizes of container, so many doses, so many hours,
// a dilution, a mixture for one weight.
func TestAlteredFiguresFromShelf(t *testing.T) {
	alterList(t, jobOf(t, "../../testdata/orders/harbour-shelf.toml", "--shelf", "../../testdata/shelves/harbour.toml"), 3000)
}

// alterList alters every figure of a list, in at least so many ways in all.
func alterList(t *testing.T, j *job, least int64) {
	var tried atomic.Int64
	t.Run("syringe", func(t *testing.T) {
		for i, p := range j.list.Plans {
			t.Run(fmt.Sprint(p.Number), func(t *testing.T) {
				t.Parallel()
				alterAll(t, j, i, &tried)
			})
		}
	})
	if n := tried.Load(); n < least {
		t.Errorf("only %d alterations were tried", n)
	}
	t.Logf("%d alterations tried", tried.Load())
}

// alterAll alters every figure of one syringe: in every way on all papers at
// once, and in one way on each paper by itself.
func alterAll(t *testing.T, j *job, i int, tried *atomic.Int64) {
	figures := j.figuresOf(i)
	if _, err := recheck.Check(j.stated(i, figures, figures)); err != nil {
		t.Fatalf("unaltered: %v", err)
	}
	seen := map[string]bool{}
	for at, f := range figures {
		wrong := alterations(f.Text)
		if len(wrong) > 0 && repeated(figures, f.Name) {
			tried.Add(1)
			if stands(j, i, figures, func(k int) bool { return k == at }, wrong[0]) {
				t.Errorf("on the %s alone %s passed, %q as %q", f.Paper, f.Name, f.Text, wrong[0])
			}
		}
		if seen[f.Name] {
			continue
		}
		seen[f.Name] = true
		for _, text := range wrong {
			tried.Add(1)
			if stands(j, i, figures, func(k int) bool { return figures[k].Name == f.Name }, text) {
				t.Errorf("on all papers %s passed, %q as %q", f.Name, f.Text, text)
			}
		}
	}
}

// stands reports whether the second route passes the figures with those that
// pick chooses altered to text.
func stands(j *job, i int, figures []recheck.Figure, pick func(int) bool, text string) bool {
	changed := append([]recheck.Figure(nil), figures...)
	for k := range changed {
		if pick(k) {
			changed[k].Text = text
		}
	}
	_, err := recheck.Check(j.stated(i, changed, figures))
	return err == nil
}

func repeated(figures []recheck.Figure, name string) bool {
	n := 0
	for _, f := range figures {
		if f.Name == name {
			n++
		}
	}
	return n > 1
}

var firstNumber = regexp.MustCompile(`\d[\d,]*(\.\d+)?`)

// alterations are wrong readings of a printed figure.
func alterations(text string) []string {
	var out []string
	at := firstNumber.FindStringIndex(text)
	if at != nil {
		number := text[at[0]:at[1]]
		for _, n := range wrongNumbers(number) {
			out = append(out, text[:at[0]]+n+text[at[1]:])
		}
	}
	if strings.HasPrefix(text, "0 ") { // nothing is nothing in any unit
		return out
	}
	for _, swap := range [][2]string{{"mg", "micrograms"}, {"micrograms", "mg"}, {"microgram", "mg"}, {"mg", "g"}, {"units", "mg"}, {"mmol", "mg"},
		{"/min", "/h"}, {"/h", "/min"}, {"/kg", ""}, {"mL/h", "L/h"}, {" mL", " L"}, {" h", " min"}, {" kg", " g"}, {" cm", " m"},
		{"make up to", "add to"}, {"neat", "make up to"}, {"lean", "actual"}, {"actual", "lean"}, {"adjusted", "ideal"}, {"male", "female"}, {"Dec", "Nov"}, {"years", "months"}} {
		if s := swapped(text, swap[0], swap[1]); s != text {
			out = append(out, s)
		}
	}
	return out
}

// swapped puts one word or unit for another, whole ones only.
func swapped(text, from, to string) string {
	letter := func(s string, last bool) bool {
		if s == "" {
			return false
		}
		r := rune(s[0])
		if last {
			r = rune(s[len(s)-1])
		}
		return unicode.IsLetter(r)
	}
	for at := 0; ; at++ {
		k := strings.Index(text[at:], from)
		if k < 0 {
			return text
		}
		at += k
		before, after := text[:at], text[at+len(from):]
		if !(letter(before, true) && letter(from, false)) && !(letter(after, false) && letter(from, true)) {
			return before + to + after
		}
	}
}

// wrongNumbers are the number with its last digit changed, ten times, a tenth,
// sixty times, a sixtieth and a thousand times, written as paper would.
func wrongNumbers(number string) []string {
	bare := strings.ReplaceAll(number, ",", "")
	r, ok := new(big.Rat).SetString(bare)
	if !ok {
		return nil
	}
	unit := big.NewRat(1, 1)
	if _, tail, point := strings.Cut(bare, "."); point {
		unit.SetFrac(big.NewInt(1), new(big.Int).Exp(big.NewInt(10), big.NewInt(int64(len(tail))), nil))
	}
	var out []string
	for _, v := range []*big.Rat{new(big.Rat).Add(r, unit), new(big.Rat).Sub(r, unit), mul(r, 10, 1), mul(r, 1, 10), mul(r, 60, 1), mul(r, 1, 60), mul(r, 1000, 1)} {
		if v.Sign() < 0 || v.Cmp(r) == 0 {
			continue
		}
		text := v.FloatString(4)
		text = strings.TrimSuffix(strings.TrimRight(text, "0"), ".")
		if len(bare) == 2 && bare[0] == '0' { // a day or an hour, "01"
			text = fmt.Sprintf("%02s", text)
		}
		out = append(out, grouped(text))
	}
	return out
}

func mul(r *big.Rat, a, b int64) *big.Rat { return new(big.Rat).Mul(r, big.NewRat(a, b)) }

func grouped(text string) string {
	head, tail, point := strings.Cut(text, ".")
	var b strings.Builder
	for i, d := range head {
		if i > 0 && (len(head)-i)%3 == 0 {
			b.WriteByte(',')
		}
		b.WriteRune(d)
	}
	if point {
		return b.String() + "." + tail
	}
	return b.String()
}
