package dilution_test

import (
	"fmt"
	"maps"
	"math/big"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"sync"
	"testing"

	"drawup/dilution/body"
	"drawup/dilution/formulary"
	"drawup/dilution/refusal"
)

// A row is one row of stored limits, with its figures as they are written, so
// that boluses and infusions share the tests below.
type row struct {
	drug               formulary.Drug
	use                string // bolus, infusion
	purpose, ages      string
	routes             []string
	fits               func(body.Age) bool
	hardLow, usualLow  string
	usualHigh, highest string
	total, frail       bool
}

func (r row) String() string {
	return fmt.Sprintf("%s, %s, %s, %s", r.drug.Name, r.use, r.purpose, strings.Join(r.routes, " "))
}

// lowest is the lowest stored figure that a slip downwards is held against.
func (r row) lowest() string {
	if r.hardLow != "" {
		return r.hardLow
	}
	return r.usualLow
}

func rowOf[T any](d formulary.Drug, use string, x formulary.Rule[T]) row {
	r := row{drug: d, use: use, purpose: x.For, ages: x.Ages(), routes: x.Routes, fits: x.Fits, hardLow: x.HardLow.Text,
		usualLow: x.UsualLow.Text, usualHigh: x.UsualHigh.Text, total: x.TotalMax.Given(), frail: x.Frail}
	for _, f := range []formulary.Figure[T]{x.UsualHigh, x.SoftHigh, x.HardHigh} {
		if f.Given() {
			r.highest = f.Text
		}
	}
	return r
}

// rowsOf is every row of a drug.
func rowsOf(d formulary.Drug) []row {
	var out []row
	for _, x := range d.Doses {
		out = append(out, rowOf(d, "bolus", x))
	}
	for _, x := range d.Rates {
		out = append(out, rowOf(d, "infusion", x))
	}
	return out
}

// eachRow runs check for every row of the formulary, the drugs side by side.
func eachRow(t *testing.T, check func(*testing.T, *formulary.Formulary, row)) {
	f := starter(t)
	rows := 0
	t.Run("drugs", func(t *testing.T) {
		for _, d := range f.Drugs() {
			rows += len(rowsOf(d))
			t.Run(d.Name, func(t *testing.T) {
				t.Parallel()
				for _, r := range rowsOf(d) {
					check(t, f, r)
				}
			})
		}
	})
	if rows < 450 {
		t.Fatalf("got %d rows, want the whole starter formulary", rows)
	}
}

// times multiplies the number at the head of a figure, "0.3 mg/kg", exactly.
func times(t testing.TB, figure string, by *big.Rat) string {
	t.Helper()
	number, unit, ok := strings.Cut(figure, " ")
	x, good := new(big.Rat).SetString(number)
	if !ok || !good {
		t.Fatalf("got the figure %q, want a number and a unit", figure)
	}
	x.Mul(x, by)
	text := x.FloatString(12)
	text = strings.TrimRight(strings.TrimRight(text, "0"), ".")
	return text + " " + unit
}

// fitting are invented patients whose ages the row covers; two of them are
// light, for rows with an absolute maximum.
func fitting(t *testing.T, r row) []string {
	t.Helper()
	var out []string
	for _, p := range []struct{ age, height, weight string }{
		{"40 years", "168 cm", "70 kg"}, {"70 years", "168 cm", "70 kg"}, {"41 years", "150 cm", "37 kg"},
		{"4 years", "102 cm", "16 kg"}, {"7 years", "122 cm", "23 kg"}, {"14 years", "160 cm", "50 kg"},
		{"2 years", "86 cm", "12 kg"}, {"6 months", "66 cm", "7.5 kg"}, {"20 days", "52 cm", "3.6 kg"},
		{"5 days", "50 cm", "3.2 kg"},
	} {
		age, err := body.ParseAge(p.age)
		if err != nil {
			t.Fatal(err)
		}
		if r.fits(age) {
			frail := fmt.Sprintf("frail = %v\n", r.frail)
			out = append(out, "\n[[patient]]\n"+frail+lines(key("id", "A"), key("sex", "female"), key("age", p.age), key("height", p.height), key("weight", p.weight)))
		}
	}
	if len(out) == 0 {
		t.Fatalf("%v: no patient of the test fits", r)
	}
	return out
}

// ways are the orders in which the drug may be asked for, without the dose:
// each presentation as it is, and diluted to either end of its bounds. Of
// presentations alike in strength and use one stands for all.
func (r row) ways(t *testing.T) (table string, ways []string) {
	t.Helper()
	seen := map[string]bool{}
	for _, p := range r.drug.Presentations {
		strength, _ := p.Amount.In(p.Volume)
		alike := fmt.Sprint(uk().Concentration(strength), p.Neat, p.Powder(), len(p.Diluents), p.Uses)
		if !p.For(r.use) || !r.byRoute(p) || p.Volume.Given() && seen[alike] {
			continue
		}
		seen[alike] = true
		head := lines(key("drug", r.drug.Name), key("presentation", p.ID), key("indication", r.purpose), key("route", r.routes[0]))
		if r.use == "bolus" {
			ways = append(ways, head)
		}
		for _, b := range r.drug.Bounds {
			if b.Use == r.use {
				ways = append(ways, r.diluted(t, head, p, b)...)
			}
		}
	}
	if r.use == "infusion" {
		return "infusion", ways
	}
	return "syringe", ways
}

// byRoute reports whether the presentation may be given by the row's first
// route, which is the one that the orders name.
func (r row) byRoute(p formulary.Presentation) bool {
	return len(p.Routes) == 0 || slices.Contains(p.Routes, r.routes[0])
}

func (r row) diluted(t *testing.T, head string, p formulary.Presentation, b formulary.Bounds) []string {
	t.Helper()
	line, diluents := b.Line, []string{""}
	if line == "any" {
		line = "peripheral"
	}
	if len(p.Diluents) > 0 {
		diluents = append(diluents, key("diluent", p.Diluents[0].Name)+"\n")
	}
	var out []string
	for i, c := range []string{b.Low.Text, b.High.Text} {
		for _, d := range diluents {
			if r.use == "bolus" {
				for _, v := range [][]string{{"10 mL"}, {"20 mL", "50 mL"}}[i] {
					out = append(out, head+d+lines(key("concentration", c), key("volume", v)))
				}
				continue
			}
			amount := strings.TrimSuffix(times(t, c, big.NewRat(50, 1)), "/mL")
			out = append(out, head+d+lines(key("mix", amount+" in 50 mL"), key("line", line)))
		}
	}
	return out
}

// asked is the way with the dose or dose rate in it.
func (r row) asked(way, figure string) string {
	if r.use == "infusion" {
		return way + key("start", figure) + "\n"
	}
	return way + key("dose", figure) + "\n"
}

// inEachWay asks for the figure in each way and gives the reasons.
func (r row) inEachWay(t *testing.T, f *formulary.Formulary, patient, table string, ways []string, figure string) []refusal.List {
	t.Helper()
	var bodies []string
	for _, way := range ways {
		bodies = append(bodies, r.asked(way, figure))
	}
	return eachAlone(t, f, patient, table, bodies)
}

// limitCodes are the refusals that a stored limit gives.
var limitCodes = []refusal.Code{refusal.SlipThousand, refusal.SlipTen, refusal.DoseAboveHard, refusal.DoseBelowHard, refusal.DoseAboveTotal,
	refusal.RateAboveHard, refusal.RateBelowHard, refusal.SoftLimitNotSigned, refusal.FormularyBlank}

// slips are the figures that must never pass: the lowest and the highest times
// 1000, the highest times ten, a tenth and a thousandth of the lowest.
func (r row) slips(t *testing.T) []string {
	out := []string{times(t, r.highest, big.NewRat(1000, 1)), times(t, r.highest, big.NewRat(10, 1))}
	if low := r.lowest(); low != "" {
		out = append(out, times(t, low, big.NewRat(1000, 1)), times(t, low, big.NewRat(1, 10)), times(t, low, big.NewRat(1, 1000)))
	}
	return out
}

// Every slip is refused in every way in which the drug can be asked for, and
// by the limits themselves in every way in which the dose is reached.
func TestSlipsOnEveryStoredRange(t *testing.T) {
	never := unmakeable(t)
	eachRow(t, func(t *testing.T, f *formulary.Formulary, r row) {
		patient := fitting(t, r)[0]
		table, ways := r.ways(t)
		_, mute := never[r.String()]
		for _, figure := range r.slips(t) {
			reached := false
			var open []string
			for i, reasons := range r.inEachWay(t, f, patient, table, ways, figure) {
				codes := reasons.Refusals().Codes()
				limited := slices.ContainsFunc(codes, func(c refusal.Code) bool { return slices.Contains(limitCodes, c) })
				reached = reached || limited
				if len(codes) == 0 || !limited && !unmixed(codes) {
					t.Errorf("%v: got %v for %s, want a refusal by a limit, as\n%s", r, codes, figure, ways[i])
				}
				if limited || !barred(codes) {
					open = append(open, ways[i])
				}
			}
			if reached == mute {
				t.Errorf("%v: %s was held against a limit: %v; the test says that the row can be made: %v", r, figure, reached, !mute)
			}
			ways = open
		}
	})
}

// Ten times the highest usual figure is refused unless somebody signs.
func TestTenTimesTheUsual(t *testing.T) {
	eachRow(t, func(t *testing.T, f *formulary.Formulary, r row) {
		if r.usualHigh == "" {
			return
		}
		table, ways := r.ways(t)
		ten := times(t, r.usualHigh, big.NewRat(10, 1))
		for _, reasons := range r.inEachWay(t, f, fitting(t, r)[0], table, ways, ten) {
			if !reasons.Refused() {
				t.Errorf("%v: %s: ten times it passes unsigned", r, r.usualHigh)
				break
			}
		}
	})
}

// barred reports a refusal in which the dose has no part: the presentation or
// the mixture itself. The same way is refused for every other figure as well, so
// it need not be tried with them.
func barred(codes []refusal.Code) bool {
	return slices.ContainsFunc(codes, func(c refusal.Code) bool {
		return slices.Contains([]refusal.Code{refusal.DisplacementBlank, refusal.MustBeDiluted, refusal.DiluentMissing,
			refusal.DiluentNotListed, refusal.ConcentrationTooHigh, refusal.ConcentrationTooLow, refusal.AgeOutside, refusal.RouteNotListed}, c)
	})
}

// unmixed reports that the presentation or the mixture itself was refused, so
// that the dose was never reached: that way of asking says nothing of the limits.
// The patient fits the row's ages and the route is the row's, so those two refusals
// are of the presentation.
func unmixed(codes []refusal.Code) bool {
	for _, c := range []refusal.Code{refusal.DisplacementBlank, refusal.MustBeDiluted, refusal.DiluentMissing, refusal.DiluentNotListed,
		refusal.ConcentrationTooHigh, refusal.ConcentrationTooLow, refusal.VolumeOffGraduation, refusal.VolumeBelowMeasurable,
		refusal.AgeOutside, refusal.RouteNotListed} { // the presentation's own age and routes
		if slices.Contains(codes, c) {
			return true
		}
	}
	return false
}

// The usual figures of every row can be made in some way, unless the test says
// why not.
func TestUsualFiguresPass(t *testing.T) {
	var lock sync.Mutex
	used, never, small := map[string]bool{}, unmakeable(t), offTheScale(t)
	eachRow(t, func(t *testing.T, f *formulary.Formulary, r row) {
		for _, figure := range []string{r.usualLow, r.usualHigh} {
			if figure == "" {
				continue
			}
			name := r.String()
			why, excused := never[name]
			// A figure of one age band alone is excused with the band in its name.
			for _, part := range []string{name, name + ", " + r.ages} {
				if !excused {
					name = part + ": " + figure
					why, excused = small[name]
				}
			}
			lock.Lock()
			used[name] = used[name] || excused
			lock.Unlock()
			switch made, codes := r.made(t, f, figure); {
			case !made && !excused:
				t.Errorf("%s %s cannot be made in any way: %v", r, figure, codes)
			case made && excused:
				t.Errorf("%s %s can be made, though the test says: %s", r, figure, why)
			}
		}
	})
	for _, list := range []map[string]string{never, small} {
		for name := range list {
			if !used[name] {
				t.Errorf("the test excuses %q, which is no row", name)
			}
		}
	}
}

// made reports whether any way gives the figure to any fitting patient, and
// otherwise all codes that stand against it.
func (r row) made(t *testing.T, f *formulary.Formulary, figure string) (bool, []refusal.Code) {
	table, ways := r.ways(t)
	var all []refusal.Code
	for _, patient := range fitting(t, r) {
		for _, way := range ways {
			codes := codesOf(t, f, patient, table, r.asked(way, figure))
			if len(codes) == 0 {
				return true, nil
			}
			for _, c := range codes {
				if !slices.Contains(all, c) {
					all = append(all, c)
				}
			}
		}
	}
	return false, all
}

// unmakeable are the rows that no container of the starter formulary can
// serve, and why.
func unmakeable(t *testing.T) map[string]string { return excused(t, "unmakeable") }

// offTheScale are usual figures that no single dilution to an end of the
// bounds lets a graduation show, or that no syringe holds.
func offTheScale(t *testing.T) map[string]string {
	out := excused(t, "too small")
	maps.Copy(out, excused(t, "too large"))
	return out
}

// excused is what the tables of testdata/formulary/excused say of one kind.
func excused(t *testing.T, kind string) map[string]string {
	t.Helper()
	files, err := filepath.Glob("../testdata/formulary/excused/*.tsv")
	if err != nil || len(files) == 0 {
		t.Fatalf("no table of excuses: %v", err)
	}
	out := map[string]string{}
	for _, name := range files {
		data, err := os.ReadFile(name)
		if err != nil {
			t.Fatal(err)
		}
		for line := range strings.Lines(string(data)) {
			cells := strings.Split(strings.TrimRight(line, "\n"), "\t")
			if len(cells) != 3 {
				t.Fatalf("%s: got %q, want kind, row and why", name, line)
			}
			if cells[0] == kind {
				out[cells[1]] = cells[2]
			}
		}
	}
	return out
}

// A row without a lower figure cannot catch a slip downwards; every plan by it
// says so.
func TestRowsWithoutLowerFigureSaySo(t *testing.T) {
	eachRow(t, func(t *testing.T, f *formulary.Formulary, r row) {
		if r.lowest() != "" {
			return
		}
		table, ways := r.ways(t)
		for _, reasons := range r.inEachWay(t, f, fitting(t, r)[0], table, ways, r.highest) {
			if !reasons.Refused() && !slices.Contains(reasons.Cautions().Codes(), refusal.FormularyBlank) {
				t.Errorf("%v: passes without a word that it was checked upwards only", r)
			}
		}
	})
}
