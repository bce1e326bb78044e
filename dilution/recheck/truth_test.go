package recheck

import (
	"fmt"
	"math/big"
	"math/rand"
	"strings"
	"time"
)

// This file makes true plans by plain fractions (math/big.Rat), with unit
// factors, roundings and calendar of its own, and prints them. All drugs,
// doses and people are invented.

func rat(n, d int64) *big.Rat      { return big.NewRat(n, d) }
func mul(a, b *big.Rat) *big.Rat   { return new(big.Rat).Mul(a, b) }
func quo(a, b *big.Rat) *big.Rat   { return new(big.Rat).Quo(a, b) }
func add(a, b *big.Rat) *big.Rat   { return new(big.Rat).Add(a, b) }
func sub(a, b *big.Rat) *big.Rat   { return new(big.Rat).Sub(a, b) }
func less(a, b *big.Rat) bool      { return a.Cmp(b) < 0 }
func decimalOf(s string) *big.Rat  { r, _ := new(big.Rat).SetString(s); return r }
func floorRat(r *big.Rat) *big.Int { return new(big.Int).Div(r.Num(), r.Denom()) }

// toStep brings r to a multiple of step: add is 1/2 for half up, 0 for down.
func toStep(r, step *big.Rat, lift *big.Rat) *big.Rat {
	n := floorRat(add(quo(r, step), lift))
	return mul(new(big.Rat).SetInt(n), step)
}

func upStep(r, step *big.Rat) *big.Rat {
	d := toStep(r, step, rat(0, 1))
	if d.Cmp(r) < 0 {
		d = add(d, step)
	}
	return d
}

// plain writes a terminating decimal without trailing zeros.
func plain(r *big.Rat) string {
	s := r.FloatString(15)
	return strings.TrimSuffix(strings.TrimRight(s, "0"), ".")
}

// comma groups the whole part from 1,000.
func comma(s string) string {
	front, back, point := strings.Cut(s, ".")
	for i := len(front) - 3; i > 0; i -= 3 {
		front = front[:i] + "," + front[i:]
	}
	if point {
		return front + "." + back
	}
	return front
}

func figureOf(r *big.Rat, unit string) string { return comma(plain(r)) + " " + unit }

// shortRat is the short printing rule on the number as printed.
func shortRat(r *big.Rat) *big.Rat {
	if r.Sign() == 0 {
		return r
	}
	for places := 0; places <= 15; places++ {
		if exact := decimalOf(r.FloatString(places)); exact.Cmp(r) == 0 {
			digits := strings.Trim(strings.Replace(plain(r), ".", "", 1), "0")
			if len(digits) <= 4 {
				return r
			}
			break
		}
	}
	if !less(r, rat(1000, 1)) {
		return decimalOf(r.FloatString(0))
	}
	places := 2
	for x := new(big.Rat).Set(r); !less(x, rat(10, 1)); x = quo(x, rat(10, 1)) {
		places--
	}
	for x := new(big.Rat).Set(r); less(x, rat(1, 1)); x = mul(x, rat(10, 1)) {
		places++
	}
	return decimalOf(r.FloatString(max(places, 0)))
}

// volumeText prints a volume or a flow rate: exactly when two decimals hold it.
func volumeText(r *big.Rat, unit string) string {
	if !mul(r, rat(100, 1)).IsInt() {
		r = shortRat(r)
	}
	return figureOf(r, unit)
}

// movedText says in per cent how far a rounding went.
func movedText(rounded, exact *big.Rat) string {
	percent := mul(quo(sub(rounded, exact), exact), rat(100, 1))
	switch percent.Sign() {
	case 1:
		return figureOf(shortRat(percent), "% more")
	case -1:
		return figureOf(shortRat(percent.Neg(percent)), "% less")
	}
	return "nothing"
}

// sizes of units against the smallest of their kind, written for this file.
var unitSizes = map[string]*big.Rat{
	"g": rat(1000000, 1), "mg": rat(1000, 1), "micrograms": rat(1, 1), "nanograms": rat(1, 1000),
	"units": rat(1, 1), "milliunits": rat(1, 1000), "mmol": rat(1000, 1), "micromol": rat(1, 1),
}

var families = [][]string{{"g", "mg", "micrograms", "nanograms"}, {"units", "milliunits"}, {"mmol", "micromol"}}

// drugText prints an amount (counted in the smallest of its family) in the
// first unit that gives a number of at least one.
func drugText(r *big.Rat, family int, tail string) string {
	for _, u := range families[family] {
		if tail != "" && u == "g" {
			continue
		}
		if n := quo(r, unitSizes[u]); !less(n, rat(1, 1)) {
			return figureOf(shortRat(n), u+tail)
		}
	}
	u := families[family][len(families[family])-1]
	return figureOf(shortRat(quo(r, unitSizes[u])), u+tail)
}

// A truth collects the lines of one true plan.
type truth struct {
	r          *rand.Rand
	asked, out []Figure
	record     []string
	own        []string
	family     int
	strength   *big.Rat // per mL, smallest unit of the family
	conc       *big.Rat
	drug, fin  *big.Rat
	weights    map[string]*big.Rat
	start      *big.Rat // pump rate
	assay      string
	papers     []string
}

func (p *truth) pick(texts ...string) string { return texts[p.r.Intn(len(texts))] }

func (p *truth) print(name, text string) {
	paper := p.papers[p.r.Intn(len(p.papers))]
	p.out = append(p.out, Figure{Paper: paper, Name: name, Text: text})
}

func (p *truth) ask(name, text string) {
	if text[0] >= '0' && text[0] <= '9' {
		text = strings.ReplaceAll(text, ",", "")
	}
	p.asked = append(p.asked, Figure{Paper: "order", Name: name, Text: text})
}

func (p *truth) both(name, text string) {
	p.print(name, text)
	p.ask(name, text)
}

// newTruth makes a complete true plan from a seed.
func newTruth(seed int64) Stated {
	p := &truth{r: rand.New(rand.NewSource(seed)), papers: []string{"label", "draw-up", "pump card", "check sheet"}}
	p.container()
	p.mixture()
	p.sureness()
	p.body()
	p.dose()
	p.infusion()
	p.times()
	record := "# invented\n[[drug]]\nname = \"other\"\n[[drug.presentation]]\nid = \"a\"\namount = \"1 mg\"\nvolume = \"1 mL\"\n\n[[drug]]\nname = \"invented\"\n" +
		strings.Join(p.own, "\n") + "\n[[drug.presentation]]\nid = \"a\"\n" + strings.Join(p.record, "\n") +
		"\n[[drug.presentation]]\nid = \"b\"\namount = \"3 mg\"\nvolume = \"7 mL\"\n"
	return Stated{Syringe: fmt.Sprint(seed), Drug: "invented", Presentation: "a", Record: []byte(record), Asked: p.asked, Figures: p.out}
}

func (p *truth) container() {
	p.family = []int{0, 0, 0, 1, 2}[p.r.Intn(5)]
	amounts := [][]string{
		{"10 mg", "40 mg", "250 mg", "1 g", "500 micrograms", "12.5 mg", "2.5 mg"},
		{"5,000 units", "100 units", "25,000 units", "300 units"},
		{"20 mmol", "10 mmol", "6.8 mmol"},
	}[p.family]
	text := p.pick(amounts...)
	n, u, _ := strings.Cut(strings.ReplaceAll(text, ",", ""), " ")
	amount := mul(decimalOf(n), unitSizes[u])
	p.print(ContainerAmount, text)
	p.record = append(p.record, "amount = { value = \""+strings.ReplaceAll(text, ",", "")+"\", source = \"invented, value = 9\" }")
	volume := decimalOf(p.pick("1", "2", "5", "10", "20", "50"))
	if p.r.Intn(3) == 0 {
		displaced := decimalOf(p.pick("0", "0.2", "0.35", "1.1"))
		p.print(PowderAdded, figureOf(volume, "mL"))
		p.print(PowderDisplaced, figureOf(displaced, "mL"))
		p.record = append(p.record, "add = \""+plain(volume)+" mL\"")
		word := plain(displaced) + " mL"
		if displaced.Sign() == 0 {
			word = "negligible"
		}
		p.record = append(p.record, "displacement = \""+word+"\"")
		volume = add(volume, displaced)
	} else {
		p.record = append(p.record, "volume = \""+plain(volume)+" mL\" # in the pack")
	}
	p.print(ContainerVolume, figureOf(volume, "mL"))
	p.strength = quo(amount, volume)
	p.print(Strength, drugText(p.strength, p.family, "/mL"))
	step := decimalOf(p.pick("0.1", "0.2", "0.5"))
	p.drug = mul(step, rat(int64(5+p.r.Intn(90)), 1))
	p.print(DrugVolume, figureOf(p.drug, "mL"))
	p.both(DrugStep, figureOf(step, "mL"))
	count := floorRat(upStep(quo(p.drug, volume), rat(1, 1))).Int64()
	p.print(ContainerCount, comma(fmt.Sprint(count)))
	left := sub(mul(rat(count, 1), volume), p.drug)
	p.print(LeftVolume, volumeText(left, "mL"))
	p.print(LeftAmount, drugText(mul(left, p.strength), p.family, ""))
	p.extras(amount)
	off := mul(step, rat(int64(p.r.Intn(90)-45), 100))
	wanted := mul(add(p.drug, off), p.strength)
	typed := quo(wanted, unitSizes[u]).FloatString(9)
	p.ask(AmountInSyringe, typed+" "+u)
	exact := quo(mul(decimalOf(typed), unitSizes[u]), p.strength)
	p.print(DrugWanted, volumeText(exact, "mL"))
	p.print(DrugMoved, movedText(p.drug, exact))
	p.print(Row(Said, 1, "text"), volumeText(exact, "mL")+" is moved to the nearest graduation, "+figureOf(p.drug, "mL")+": "+movedText(p.drug, exact)+" than asked")
}

func (p *truth) extras(amount *big.Rat) {
	held := mul(p.drug, p.strength)
	p.print(AmountInSyringe, drugText(held, p.family, ""))
	second := rat(500, 1)
	p.print(SecondContainer, "500 micrograms")
	p.record = append(p.record, "second_amount = \"0.5 mg\"")
	p.print(SecondAmount, drugText(quo(mul(held, second), amount), 0, ""))
	if p.family == 0 {
		factor := decimalOf("4.057")
		p.print(SubstanceFactor, "4.057 mmol/g")
		p.own = append(p.own, "substance = \"4.057 mmol/g\"")
		// micromol = micrograms x factor / 1000
		p.print(SubstanceAmount, drugText(quo(mul(held, factor), rat(1000, 1)), 2, ""))
	}
}

func (p *truth) mixture() {
	method := p.pick("neat", "make up to", "add to", "withdraw, then add")
	p.both(Method, method)
	p.fin = p.drug
	if method != "neat" {
		diluent := rat(int64(1+p.r.Intn(5000)), 10)
		p.print(DiluentVolume, figureOf(diluent, "mL"))
		p.fin = add(p.drug, diluent)
	}
	p.print(FinalVolume, figureOf(p.fin, "mL"))
	held := mul(p.drug, p.strength)
	p.conc = quo(held, p.fin)
	p.print(Concentration, drugText(p.conc, p.family, "/mL"))
	p.print(SecondConcentrated, drugText(quo(quo(mul(p.drug, rat(500, 1)), p.containerVolume()), p.fin), 0, "/mL"))
	if p.family == 0 {
		p.print(SubstanceConc, drugText(quo(mul(p.conc, decimalOf("4.057")), rat(1000, 1)), 2, "/mL"))
	}
}

// containerVolume finds the volume again: 500 micrograms of the second drug are
// in each.
func (p *truth) containerVolume() *big.Rat {
	for _, f := range p.out {
		if f.Name == ContainerVolume {
			return decimalOf(strings.TrimSuffix(f.Text, " mL"))
		}
	}
	return nil
}

func barrelFor(x *big.Rat) *big.Rat {
	for _, v := range []int64{1, 2, 5, 10, 20, 50, 100, 1000} {
		if !less(rat(v, 1), x) {
			return rat(v, 1)
		}
	}
	return nil
}

// tolerance after ISO 7886-1:1993 table 1, as a part of x.
func tolerance(x, v *big.Rat) *big.Rat {
	big5 := !less(v, rat(5, 1))
	if less(x, quo(v, rat(2, 1))) {
		t := mul(v, rat(15, 1000))
		if big5 {
			return quo(add(t, mul(x, rat(1, 100))), x)
		}
		return quo(add(t, mul(x, rat(2, 100))), x)
	}
	if big5 {
		return rat(4, 100)
	}
	return rat(5, 100)
}

// root is the square root cut to fifteen decimals.
func root(r *big.Rat) *big.Rat {
	scale := new(big.Int).Exp(big.NewInt(10), big.NewInt(30), nil)
	n := floorRat(mul(r, new(big.Rat).SetInt(scale)))
	return new(big.Rat).SetFrac(new(big.Int).Sqrt(n), new(big.Int).Exp(big.NewInt(10), big.NewInt(15), nil))
}

func (p *truth) sureness() {
	assay := decimalOf(p.pick("5", "10", "2.5"))
	p.assay = figureOf(assay, "%")
	p.print(Assay, figureOf(assay, "%"))
	p.record = append(p.record, "assay = \""+plain(assay)+" %\"")
	parts := []*big.Rat{quo(assay, rat(100, 1))}
	drug, fin := barrelFor(p.drug), barrelFor(p.fin)
	p.both(DrugBarrel, figureOf(drug, "mL"))
	p.both(FinalBarrel, figureOf(fin, "mL"))
	method := p.asked[len(p.asked)-3].Text
	if method != "neat" {
		parts = append(parts, tolerance(p.drug, drug))
	}
	if method == "make up to" {
		parts = append(parts, tolerance(p.fin, fin))
	}
	sum, squares := rat(0, 1), rat(0, 1)
	for _, a := range parts {
		sum = add(sum, a)
		squares = add(squares, mul(a, a))
	}
	half := root(mul(squares, rat(4, 3)))
	if less(sum, half) {
		half = sum
	}
	percent := toStep(half, rat(1, 1000), rat(1, 2))
	p.print(IntervalPercent, figureOf(mul(percent, rat(100, 1)), "%"))
	p.print(IntervalLow, drugText(mul(p.conc, sub(rat(1, 1), percent)), p.family, "/mL"))
	p.print(IntervalHigh, drugText(mul(p.conc, add(rat(1, 1), percent)), p.family, "/mL"))
}

func (p *truth) body() {
	w, h := rat(int64(400+p.r.Intn(1100)), 10), rat(int64(1450+p.r.Intn(500)), 10)
	man := p.r.Intn(2) == 0
	pickRat := func(m, f string) *big.Rat {
		if man {
			return decimalOf(m)
		}
		return decimalOf(f)
	}
	p.both(WeightActual, figureOf(w, "kg"))
	p.both(Height, figureOf(h, "cm"))
	p.both(Age, fmt.Sprint(18+p.r.Intn(70))+" years")
	p.both(Sex, map[bool]string{true: "male", false: "female"}[man])
	ideal := add(pickRat("50", "45.5"), mul(decimalOf("2.3"), sub(quo(h, decimalOf("2.54")), rat(60, 1))))
	adjusted := w
	if !less(w, ideal) {
		adjusted = add(ideal, mul(decimalOf("0.4"), sub(w, ideal)))
	}
	bmi := quo(mul(w, rat(10000, 1)), mul(h, h))
	lean := quo(mul(rat(9270, 1), w), add(pickRat("6680", "8780"), mul(pickRat("216", "244"), bmi)))
	ratio := quo(w, h)
	james := sub(mul(pickRat("1.10", "1.07"), w), mul(pickRat("128", "148"), mul(ratio, ratio)))
	tenth := func(r *big.Rat) *big.Rat { return toStep(r, rat(1, 10), rat(1, 2)) }
	surface := toStep(root(quo(mul(h, w), rat(3600, 1))), rat(1, 100), rat(1, 2))
	p.weights = map[string]*big.Rat{"actual": w, "ideal": tenth(ideal), "adjusted": tenth(adjusted), "lean": tenth(lean), "surface": surface}
	p.print(WeightIdeal, figureOf(p.weights["ideal"], "kg"))
	p.print(WeightAdjusted, figureOf(p.weights["adjusted"], "kg"))
	p.print(WeightLean, figureOf(p.weights["lean"], "kg"))
	tenThousandth := func(r *big.Rat) *big.Rat { return toStep(r, rat(1, 10000), rat(1, 2)) }
	p.print(IdealFull, figureOf(tenThousandth(ideal), "kg"))
	p.print(AdjustedFull, figureOf(tenThousandth(adjusted), "kg"))
	p.print(LeanFull, figureOf(tenThousandth(lean), "kg"))
	p.print(WeightJames, figureOf(tenth(james), "kg"))
	p.print(SurfaceArea, figureOf(surface, "m²"))
	p.print(BMI, comma(plain(tenth(bmi))))
}

// sized chooses what a dose goes by: its word, the number, and the unit part.
func (p *truth) sized() (string, *big.Rat, string) {
	by := p.pick("actual", "ideal", "adjusted", "lean", "surface", "none")
	switch by {
	case "none":
		return by, rat(1, 1), ""
	case "surface":
		return by, p.weights[by], "/m²"
	}
	return by, p.weights[by], "/kg"
}

// doseNear gives a dose number of three digits near r, with its unit.
func (p *truth) doseNear(r *big.Rat) (*big.Rat, string) {
	units := families[p.family]
	for _, u := range units {
		if n := quo(r, unitSizes[u]); !less(n, rat(1, 10)) {
			return decimalOf(n.FloatString(2)), u
		}
	}
	u := units[len(units)-1]
	return add(decimalOf(quo(r, unitSizes[u]).FloatString(3)), rat(1, 1000)), u
}

func typedWord(by string) string {
	if by == "none" || by == "surface" {
		return ""
	}
	return " " + by
}

func (p *truth) dose() {
	by, size, part := p.sized()
	step := decimalOf(p.pick("0.1", "0.2", "0.5"))
	number, u := p.doseNear(quo(mul(p.conc, rat(int64(10+p.r.Intn(190)), 10)), size))
	p.print(Dose, figureOf(number, u+part))
	p.ask(Dose, plain(number)+" "+u+part+typedWord(by))
	p.print(DoseWeightBy, by)
	if by != "none" {
		p.print(DoseWeight, figureOf(size, map[string]string{"/kg": "kg", "/m²": "m²"}[part]))
	}
	amount := mul(mul(number, unitSizes[u]), size)
	p.print(DoseAmount, drugText(amount, p.family, ""))
	p.both(DoseStep, figureOf(step, "mL"))
	volume := toStep(quo(amount, p.conc), step, rat(1, 2))
	p.print(DoseVolume, figureOf(volume, "mL"))
	p.print(DoseWanted, volumeText(quo(amount, p.conc), "mL"))
	p.print(DoseMoved, movedText(volume, quo(amount, p.conc)))
	p.print(DoseDelivered, drugText(mul(volume, p.conc), p.family, ""))
}

func (p *truth) infusion() {
	by, size, part := p.sized()
	step := decimalOf(p.pick("0.1", "0.1", "1"))
	perHour, tail := rat(1, 1), "/h"
	if p.r.Intn(2) == 0 {
		perHour, tail = rat(60, 1), "/min"
	}
	number, u := p.doseNear(quo(mul(p.conc, rat(int64(50+p.r.Intn(900)), 10)), mul(size, perHour)))
	unitText := u + part + tail
	flow := func(n *big.Rat) *big.Rat { return quo(mul(mul(mul(n, unitSizes[u]), size), perHour), p.conc) }
	given := func(rate *big.Rat) string {
		return figureOf(shortRat(quo(mul(rate, p.conc), mul(mul(size, perHour), unitSizes[u]))), unitText)
	}
	half := rat(1, 2)
	p.print(RateWeightBy, by)
	if by != "none" {
		p.print(RateWeight, figureOf(size, map[string]string{"/kg": "kg", "/m²": "m²"}[part]))
	}
	p.both(RateStep, figureOf(step, "mL/h"))
	p.print(StartDose, figureOf(number, unitText))
	p.ask(StartDose, plain(number)+" "+unitText+typedWord(by))
	p.start = toStep(flow(number), step, half)
	p.print(StartRate, figureOf(p.start, "mL/h"))
	p.print(StartDelivered, given(p.start))
	p.print(StartFlow, volumeText(flow(number), "mL/h"))
	p.print(StartMoved, movedText(p.start, flow(number)))
	p.print(Row(Said, 2, "text"), "rounding to the pump's step changes the start dose; it gives "+given(p.start))
	p.print(Row(Bound, 1, "text"), "assay within "+p.assay)
	low, high, limit := quo(number, rat(2, 1)), mul(number, rat(2, 1)), mul(number, rat(4, 1))
	p.both(LowDose, figureOf(low, unitText))
	p.print(LowRate, figureOf(upStep(flow(low), step), "mL/h"))
	p.both(HighDose, figureOf(high, unitText))
	p.print(HighRate, figureOf(toStep(flow(high), step, rat(0, 1)), "mL/h"))
	p.both(LimitDose, figureOf(limit, unitText))
	p.print(LimitRate, figureOf(toStep(flow(limit), step, rat(0, 1)), "mL/h"))
	for row := 1; row <= 3; row++ {
		n := mul(low, rat(int64(row+1), 1))
		rate := toStep(flow(n), step, half)
		p.both(Row(Ladder, row, "dose"), figureOf(n, unitText))
		p.print(Row(Ladder, row, "rate"), figureOf(rate, "mL/h"))
		p.print(Row(Ladder, row, "delivered"), given(rate))
	}
	factors := map[string]*big.Rat{"per minute for per hour": rat(60, 1), "per hour for per minute": rat(1, 60), "ten times": rat(10, 1), "a tenth": rat(1, 10), "pounds for kilograms": rat(100000000, 45359237)}
	row := 0
	for _, kind := range []string{"per minute for per hour", "per hour for per minute", "ten times", "a tenth", "pounds for kilograms"} {
		if kind == "pounds for kilograms" && part != "/kg" {
			continue
		}
		row++
		p.print(Row(Slip, row, "kind"), kind)
		p.print(Row(Slip, row, "rate"), figureOf(toStep(mul(flow(number), factors[kind]), step, half), "mL/h"))
	}
}

func (p *truth) times() {
	layout := p.pick("02 Jan 2006 15:04", "2006-01-02 15:04")
	offsets := map[string]int{"+01:00": 60, "+00:00": 0, "-05:00": -300, "+05:45": 345, "+02:00": 120}
	first, second, third := p.pick("+01:00", "+00:00", "-05:00", "+05:45"), p.pick("+01:00", "+02:00", "-05:00"), p.pick("+01:00", "+02:00")
	zone := func(o string) *time.Location { return time.FixedZone(o, offsets[o]*60) }
	from := time.Date(2026, 1, 1, 0, p.r.Intn(60*24*700), 0, 0, zone(first))
	p.print(Prepared, from.Format(layout))
	p.print(PreparedOffset, first)
	text := p.pick("30 min", "24 h", "1 h 30 min", "2 h 14 min", "45 min", "12 h")
	minutes := map[string]int{"30 min": 30, "24 h": 1440, "1 h 30 min": 90, "2 h 14 min": 134, "45 min": 45, "12 h": 720}[text]
	p.print(UseHours, text)
	until := from.Add(time.Duration(minutes) * time.Minute).In(zone(second))
	p.print(UseBy, until.Format(layout))
	p.print(UseByOffset, second)
	run := floorRat(quo(mul(p.fin, rat(60, 1)), p.start)).Int64()
	words := fmt.Sprintf("%s h %d min", comma(fmt.Sprint(run/60)), run%60)
	if run%60 == 0 {
		words = comma(fmt.Sprint(run/60)) + " h"
	}
	if run < 60 {
		words = fmt.Sprintf("%d min", run)
	}
	p.print(RunTime, words)
	empty := first
	if p.r.Intn(2) == 0 {
		empty = third
		p.print(EmptyOffset, third)
	}
	p.print(EmptyAt, from.Add(time.Duration(run)*time.Minute).In(zone(empty)).Format(layout))
	p.print(ATC, "N01AX07")
	p.print(Serial, fmt.Sprintf("%08d", p.r.Intn(99999999)))
	p.code(until)
}

// code makes both forms of the barcode from what is printed, and in one plan of
// three those that begin with a number of the site's own. 952 is the GS1 prefix
// for demonstrations and examples; its check digit, worked by hand, is 6.
func (p *truth) code(until time.Time) {
	conc, amount, volume := p.printed(Concentration), p.printed(AmountInSyringe), p.printed(FinalVolume)
	serial := p.printed(Serial)
	p.ask(FormularyDigest, "7a83c0d1e4f5")
	p.both(Ref, "70836235")
	stamp := until.Format("0601021504")
	full := "(91)N01AX07(92)" + stamp + serial + "(93)" + codeText(conc) + "(94)" + codeText(amount) + "(95)7a83c0d1"
	short := "(91)N01AX07(92)" + stamp + serial + "(93)" + codeText(conc)
	if p.r.Intn(3) == 0 {
		p.ask(ProductNumber, "9521234000006")
		p.ask(ProductDrug, "Invented")
		p.ask(ProductConcentration, strings.ReplaceAll(conc, ",", ""))
		p.ask(ProductVolume, strings.ReplaceAll(volume, ",", ""))
		short = "(01)09521234000006(7003)" + stamp + "(10)70836235(21)" + serial
		full = short + "(91)N01AX07(93)" + codeText(conc) + "(94)" + codeText(amount) + "(95)7a83c0d1"
	}
	p.print(Row(Code, 1, "text"), full)
	p.print(Row(Code, 2, "text"), short)
	p.out = append(p.out, Figure{Paper: "another label", Name: Row(Code, 1, "text"), Text: full}, Figure{Paper: "another label", Name: Concentration, Text: conc})
}

// printed is the text of a figure that was printed before.
func (p *truth) printed(name string) string {
	for _, f := range p.out {
		if f.Name == name {
			return f.Text
		}
	}
	return ""
}

// codeText is a printed amount or concentration in the signs of the code.
func codeText(figure string) string {
	number, u, _ := strings.Cut(figure, " ")
	u, per, _ := strings.Cut(u, "/")
	if per != "" {
		per = "/" + per
	}
	value := decimalOf(strings.ReplaceAll(number, ",", ""))
	words := map[string]string{
		"g": "g", "mg": "mg", "microgram": "ug", "micrograms": "ug", "nanogram": "ng", "nanograms": "ng",
		"unit": "unit", "units": "unit", "mmol": "mmol", "micromol": "umol",
	}
	word, ok := words[u]
	if !ok {
		value, word = quo(value, rat(1000, 1)), map[string]string{"milliunit": "unit", "milliunits": "unit"}[u]
	}
	return plain(value) + word + per
}
