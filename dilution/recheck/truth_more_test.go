package recheck

import (
	"fmt"
	"math/big"
	"math/rand"
	"strings"
	"testing"
	"time"
)

// This file makes true plans of the further kinds by plain fractions, as
// truth_test.go does: two steps, two drugs, sizes of container, doses counted,
// mixtures for one weight with line and dead space.

// truthKinds makes a true plan of each kind from a seed.
var truthKinds = map[string]func(seed int64) Stated{
	"two steps": newSteps, "two drugs": newPair, "sizes": newPacks, "doses": newDoses, "one weight": newRuled,
}

func startTruth(seed int64) *truth {
	return &truth{r: rand.New(rand.NewSource(seed)), papers: []string{"label", "draw-up", "check sheet"}}
}

func (p *truth) stated(seed int64) Stated {
	record := "[[drug]]\nname = \"invented\"\n[[drug.presentation]]\nid = \"a\"\n" + strings.Join(p.record, "\n") + "\n"
	return Stated{Syringe: fmt.Sprint(seed), Drug: "invented", Presentation: "a", Record: []byte(record), Asked: p.asked, Figures: p.out}
}

// supplied prints a container of the named figures and returns its record's lines,
// its unit and its volume, with p.family and p.strength set.
func (p *truth) supplied(prefix string) (lines []string, unit string, volume *big.Rat) {
	p.family = []int{0, 0, 1, 2}[p.r.Intn(4)]
	text := p.pick([][]string{{"10 mg", "40 mg", "1 g", "500 micrograms"}, {"5,000 units", "100 units"}, {"20 mmol", "6.8 mmol"}}[p.family]...)
	bare := strings.ReplaceAll(text, ",", "")
	n, unit, _ := strings.Cut(bare, " ")
	volume = decimalOf(p.pick("1", "2", "5", "10", "20"))
	p.strength = quo(mul(decimalOf(n), unitSizes[unit]), volume)
	p.print(prefix+ContainerAmount, text)
	p.print(prefix+ContainerVolume, figureOf(volume, "mL"))
	p.print(prefix+Strength, drugText(p.strength, p.family, "/mL"))
	return []string{"amount = \"" + bare + "\"", "volume = \"" + plain(volume) + " mL\"", "assay = \"5 %\""}, unit, volume
}

// opened prints whole containers and what is left of them.
func (p *truth) opened(prefix string, drawn, volume *big.Rat) {
	count := floorRat(upStep(quo(drawn, volume), rat(1, 1))).Int64()
	left := sub(mul(rat(count, 1), volume), drawn)
	p.print(prefix+ContainerCount, comma(fmt.Sprint(count)))
	p.print(prefix+LeftVolume, volumeText(left, "mL"))
	p.print(prefix+LeftAmount, drugText(mul(left, p.strength), p.family, ""))
}

// near is the volume moved by less than half a step, and what it holds at the
// strength as nine typed decimals of the unit, with the exact volume of that.
func (p *truth) near(volume, step, strength *big.Rat, unit string) (typed string, exact *big.Rat) {
	wanted := mul(add(volume, mul(step, rat(int64(p.r.Intn(90)-45), 100))), strength)
	typed = quo(wanted, unitSizes[unit]).FloatString(9)
	return typed + " " + unit, quo(mul(decimalOf(typed), unitSizes[unit]), strength)
}

// read prints a volume with its graduation and barrel, and returns its tolerance
// and the barrel.
func (p *truth) read(name, stepName, barrelName string, volume, step *big.Rat) (*big.Rat, *big.Rat) {
	barrel := barrelFor(volume)
	p.print(name, figureOf(volume, "mL"))
	if stepName != "" {
		p.both(stepName, figureOf(step, "mL"))
	}
	p.both(barrelName, figureOf(barrel, "mL"))
	return tolerance(volume, barrel), barrel
}

func (p *truth) interval(parts []*big.Rat) {
	sum, squares := rat(0, 1), rat(0, 1)
	for _, a := range parts {
		sum, squares = add(sum, a), add(squares, mul(a, a))
	}
	half := root(mul(squares, rat(4, 3)))
	if less(sum, half) {
		half = sum
	}
	percent := toStep(half, rat(1, 1000), rat(1, 2))
	p.print(Assay, "5 %")
	p.print(IntervalPercent, figureOf(mul(percent, rat(100, 1)), "%"))
	if less(percent, rat(1, 1)) {
		p.print(IntervalLow, drugText(mul(p.conc, sub(rat(1, 1), percent)), p.family, "/mL"))
	}
	p.print(IntervalHigh, drugText(mul(p.conc, add(rat(1, 1), percent)), p.family, "/mL"))
}

func newSteps(seed int64) Stated {
	p := startTruth(seed)
	lines, unit, volume := p.supplied("")
	p.record = lines
	steps := []string{"0.01", "0.1", "0.2", "0.5"}
	drugStep, midStep, takenStep := decimalOf(p.pick(steps...)), decimalOf(p.pick(steps[1:]...)), decimalOf(p.pick(steps...))
	drug := mul(drugStep, rat(int64(1+p.r.Intn(40)), 1))
	mid := add(toStep(drug, midStep, rat(0, 1)), mul(midStep, rat(int64(1+p.r.Intn(60)), 1)))
	taken := mul(takenStep, rat(1+p.r.Int63n(max(1, floorRat(quo(mid, takenStep)).Int64())), 1))
	if less(mid, taken) {
		taken = takenStep
		mid = mul(midStep, rat(60, 1))
	}
	diluent := rat(int64(1+p.r.Intn(400)), 10)
	p.fin = add(taken, diluent)
	midConc := quo(mul(drug, p.strength), mid)
	p.conc = quo(mul(taken, midConc), p.fin)
	p.opened("", drug, volume)
	p.both(Method, "make up to")
	t1, b1 := p.read(IntermediateDrugVolume, IntermediateDrugStep, IntermediateDrugBarrel, drug, drugStep)
	t2, b2 := p.read(IntermediateVolume, IntermediateStep, IntermediateBarrel, mid, midStep)
	t3, b3 := p.read(TakenVolume, TakenStep, TakenBarrel, taken, takenStep)
	t4, b4 := p.read(FinalVolume, "", FinalBarrel, p.fin, nil)
	parts := []*big.Rat{rat(5, 100)}
	for _, side := range [][4]*big.Rat{{t1, b1, t3, b3}, {t2, b2, t4, b4}} {
		if side[1].Cmp(side[3]) == 0 {
			parts = append(parts, add(side[0], side[2]))
		} else {
			parts = append(parts, side[0], side[2])
		}
	}
	p.interval(parts)
	p.print(IntermediateDiluent, volumeText(sub(mid, drug), "mL"))
	p.print(IntermediateAmount, drugText(mul(drug, p.strength), p.family, ""))
	p.print(IntermediateConc, drugText(midConc, p.family, "/mL"))
	p.print(IntermediateLeftVolume, volumeText(sub(mid, taken), "mL"))
	p.print(IntermediateLeftAmount, drugText(mul(sub(mid, taken), midConc), p.family, ""))
	p.print(DiluentVolume, figureOf(diluent, "mL"))
	p.print(AmountInSyringe, drugText(mul(taken, midConc), p.family, ""))
	p.print(Concentration, drugText(p.conc, p.family, "/mL"))
	typed, exact := p.near(taken, takenStep, midConc, unit)
	p.ask(AmountInSyringe, typed)
	p.print(TargetMoved, movedText(taken, exact))
	p.print(DrugWanted, volumeText(quo(mul(exact, midConc), p.strength), "mL"))
	from := time.Date(2026, 1, 1, 0, p.r.Intn(60*24*700), 0, 0, time.UTC)
	p.print(Prepared, from.Format("02 Jan 2006 15:04"))
	p.both(PreparedOffset, "+00:00")
	p.print(IntermediateUseHours, "1 h 30 min")
	p.print(IntermediateUseBy, from.Add(90*time.Minute).Format("02 Jan 2006 15:04"))
	p.print(IntermediateUseByOffset, "+00:00")
	return p.stated(seed)
}

func newPair(seed int64) Stated {
	p := startTruth(seed)
	method := p.pick("neat", "make up to", "withdraw, then add")
	p.both(Method, method)
	second, unit, volume := p.supplied("other.")
	step := decimalOf(p.pick("0.1", "0.2", "0.5"))
	other := mul(step, rat(int64(1+p.r.Intn(60)), 1))
	p.opened("other.", other, volume)
	otherPart, _ := p.read(OtherVolume, OtherStep, OtherBarrel, other, step)
	held, family := mul(other, p.strength), p.family
	p.print(OtherAmount, drugText(held, p.family, ""))
	p.print(SecondAmount, drugText(held, p.family, ""))
	typed, _ := p.near(other, step, p.strength, unit)
	p.ask([]string{OtherAmount, SecondAmount}[p.r.Intn(2)], typed)
	p.both(OtherDrug, "second")

	p.record, unit, volume = p.supplied("")
	step = decimalOf(p.pick("0.1", "0.2", "0.5"))
	p.drug = mul(step, rat(int64(1+p.r.Intn(60)), 1))
	p.opened("", p.drug, volume)
	drugPart, _ := p.read(DrugVolume, DrugStep, DrugBarrel, p.drug, step)
	typed, exact := p.near(p.drug, step, p.strength, unit)
	p.ask(AmountInSyringe, typed)
	p.print(DrugWanted, volumeText(exact, "mL"))
	p.print(DrugMoved, movedText(p.drug, exact))
	p.fin = add(p.drug, other)
	if method != "neat" {
		diluent := rat(int64(1+p.r.Intn(400)), 10)
		p.print(DiluentVolume, figureOf(diluent, "mL"))
		p.fin = add(p.fin, diluent)
	}
	finalPart, _ := p.read(FinalVolume, "", FinalBarrel, p.fin, nil)
	p.conc = quo(mul(p.drug, p.strength), p.fin)
	p.print(AmountInSyringe, drugText(mul(p.drug, p.strength), p.family, ""))
	p.print(Concentration, drugText(p.conc, p.family, "/mL"))
	p.print(SecondConcentrated, drugText(quo(held, p.fin), family, "/mL"))
	share := quo(other, p.fin)
	parts := map[string][]*big.Rat{"neat": {mul(share, drugPart), mul(share, otherPart)}, "make up to": {drugPart, finalPart}, "withdraw, then add": {drugPart}}[method]
	p.interval(append(parts, rat(5, 100)))
	s := p.stated(seed)
	s.OtherDrug, s.OtherPresentation = "second", "z"
	s.OtherRecord = []byte("[[drug]]\nname = \"second\"\n[[drug.presentation]]\nid = \"z\"\n" + strings.Join(second, "\n") + "\n")
	return s
}

func newPacks(seed int64) Stated {
	p := startTruth(seed)
	lines, unit, volume := p.supplied("")
	p.record = lines
	times := decimalOf(p.pick("0.5", "2", "2.5", "5"))
	second := mul(volume, times)
	amount := quo(mul(second, p.strength), unitSizes[unit])
	p.record = append(p.record, "[[drug.presentation]]", "id = \"b\"", "amount = \""+plain(amount)+" "+unit+"\"", "volume = \""+plain(second)+" mL\"")
	first, others := int64(1+p.r.Intn(4)), int64(1+p.r.Intn(4))
	held := add(mul(volume, rat(first, 1)), mul(second, rat(others, 1)))
	smaller := volume
	if less(second, volume) {
		smaller = second
	}
	step := decimalOf(p.pick("0.1", "0.05"))
	left := mul(step, rat(p.r.Int63n(floorRat(quo(smaller, step)).Int64()), 1))
	p.drug = sub(held, left)
	p.print(Row(Pack, 1, "presentation"), "a")
	p.print(Row(Pack, 1, "amount"), p.printed(ContainerAmount))
	p.print(Row(Pack, 1, "volume"), figureOf(volume, "mL"))
	p.print(Row(Pack, 1, "count"), fmt.Sprint(first))
	p.print(Row(Pack, 2, "presentation"), "b")
	p.print(Row(Pack, 2, "amount"), figureOf(amount, unit))
	p.print(Row(Pack, 2, "volume"), figureOf(second, "mL"))
	p.print(Row(Pack, 2, "count"), fmt.Sprint(others))
	p.print(ContainerCount, fmt.Sprint(first+others))
	p.print(LeftVolume, volumeText(left, "mL"))
	p.print(LeftAmount, drugText(mul(left, p.strength), p.family, ""))
	p.print(DrugVolume, figureOf(p.drug, "mL"))
	p.both(DrugStep, figureOf(step, "mL"))
	typed, _ := p.near(p.drug, step, p.strength, unit)
	p.ask(AmountInSyringe, typed)
	return p.stated(seed)
}

func newDoses(seed int64) Stated {
	p := startTruth(seed)
	lines, unit, _ := p.supplied("")
	p.record = lines
	method, count := p.pick("neat", "make up to"), int64(1+p.r.Intn(9))
	step, doseStep := decimalOf(p.pick("0.1", "0.2")), decimalOf("0.1")
	p.both(Method, method)
	number := decimalOf(quo(mul(p.strength, rat(int64(20+p.r.Intn(180)), 100)), unitSizes[unit]).FloatString(6))
	dose := mul(number, unitSizes[unit])
	p.both(Dose, figureOf(number, unit))
	p.both(DoseStep, "0.1 mL")
	p.both(DoseCount, fmt.Sprint(count))
	p.print(DoseAmount, drugText(dose, p.family, ""))
	wanted := quo(mul(dose, rat(count, 1)), p.strength)
	each := toStep(quo(dose, p.strength), doseStep, rat(1, 2))
	p.drug = mul(each, rat(count, 1))
	p.fin, p.conc = p.drug, p.strength
	if method != "neat" {
		p.drug = toStep(wanted, step, rat(1, 2))
		p.fin = add(upStep(wanted, rat(1, 1)), rat(int64(9+p.r.Intn(20)), 1))
		p.conc = quo(mul(p.drug, p.strength), p.fin)
		each = toStep(quo(dose, p.conc), doseStep, rat(1, 2))
		if less(p.fin, mul(each, rat(count, 1))) { // rounded up too far to fit
			return newDoses(seed + 1_000_000)
		}
		p.print(DiluentVolume, figureOf(sub(p.fin, p.drug), "mL"))
		p.print(DrugVolume, figureOf(p.drug, "mL"))
		p.both(DrugStep, figureOf(step, "mL"))
		p.both(FinalVolume, figureOf(p.fin, "mL"))
	} else {
		p.print(DrugVolume, figureOf(p.drug, "mL"))
		p.print(FinalVolume, figureOf(p.fin, "mL"))
	}
	p.print(DoseVolume, figureOf(each, "mL"))
	p.print(DoseDelivered, drugText(mul(each, p.conc), p.family, ""))
	p.print(DrugWanted, volumeText(wanted, "mL"))
	p.print(DrugMoved, movedText(p.drug, wanted))
	p.print(AmountInSyringe, drugText(mul(p.drug, p.strength), p.family, ""))
	p.print(Concentration, drugText(p.conc, p.family, "/mL"))
	return p.stated(seed)
}

func newRuled(seed int64) Stated {
	p := startTruth(seed)
	p.record = []string{"amount = \"200 mg\"", "volume = \"5 mL\""}
	p.print(ContainerAmount, "200 mg")
	p.print(ContainerVolume, "5 mL")
	p.strength = rat(40000, 1)
	rule, weight := decimalOf(p.pick("1", "0.1", "5", "0.5")), rat(int64(30+p.r.Intn(900)), 10)
	p.fin = decimalOf(p.pick("50", "100", "60"))
	wanted := quo(mul(mul(rule, weight), mul(rat(60, 1), p.fin)), p.strength)
	step := decimalOf(p.pick("0.1", "0.2"))
	p.drug = toStep(wanted, step, rat(1, 2))
	if p.drug.Sign() == 0 || !less(p.drug, p.fin) {
		return newRuled(seed + 1_000_000)
	}
	p.conc = quo(mul(p.drug, p.strength), p.fin)
	p.both(Method, "make up to")
	p.both(WeightActual, figureOf(weight, "kg"))
	p.print(RateWeightBy, "actual")
	p.print(RateWeight, figureOf(weight, "kg"))
	p.both(RuleRate, figureOf(rule, "micrograms/kg/min"))
	p.print(DrugVolume, figureOf(p.drug, "mL"))
	p.both(DrugStep, figureOf(step, "mL"))
	p.print(DrugWanted, volumeText(wanted, "mL"))
	p.print(DrugMoved, movedText(p.drug, wanted))
	p.print(DiluentVolume, figureOf(sub(p.fin, p.drug), "mL"))
	p.both(FinalVolume, figureOf(p.fin, "mL"))
	p.print(AmountInSyringe, drugText(mul(p.drug, p.strength), 0, ""))
	p.print(Concentration, drugText(p.conc, 0, "/mL"))
	p.both(RateStep, "0.1 mL/h")
	dose := mul(rule, rat(int64(1+p.r.Intn(5)), 1))
	p.both(StartDose, figureOf(dose, "micrograms/kg/min"))
	p.start = toStep(quo(mul(mul(dose, weight), rat(60, 1)), p.conc), rat(1, 10), rat(1, 2))
	p.print(StartRate, figureOf(p.start, "mL/h"))
	priming, dead := rat(int64(p.r.Intn(30)), 10), rat(int64(1+p.r.Intn(4)), 10)
	p.both(Priming, figureOf(priming, "mL"))
	p.both(DeadSpace, figureOf(dead, "mL"))
	words := func(minutes int64) string {
		switch {
		case minutes < 60:
			return fmt.Sprintf("%d min", minutes)
		case minutes%60 == 0:
			return fmt.Sprintf("%d h", minutes/60)
		}
		return fmt.Sprintf("%d h %d min", minutes/60, minutes%60)
	}
	usable := floorRat(quo(mul(sub(sub(p.fin, priming), dead), rat(60, 1)), p.start)).Int64()
	p.print(UsableTime, words(usable))
	p.print(RunTime, words(floorRat(quo(mul(p.fin, rat(60, 1)), p.start)).Int64()))
	wantedTime := words(usable - p.r.Int63n(min(usable, 300)))
	p.both(WantedTime, wantedTime)
	from := time.Date(2026, 5, 1, 0, p.r.Intn(100000), 0, 0, time.UTC)
	p.print(Prepared, from.Format("2006-01-02 15:04"))
	p.both(PreparedOffset, "+00:00")
	p.print(EmptyAt, from.Add(time.Duration(usable)*time.Minute).Format("2006-01-02 15:04"))
	return p.stated(seed)
}

// A hundred true plans of each kind agree.
func TestFurtherTruePlansAgree(t *testing.T) {
	for kind, plan := range truthKinds {
		for seed := int64(1); seed <= 100; seed++ {
			s := plan(seed)
			if _, err := Check(s); err != nil {
				t.Fatalf("%s, seed %d: %v\nasked %v\nrecord %s\nfigures %v", kind, seed, err, s.Asked, s.Record, s.Figures)
			}
		}
	}
}

// Figures of many of them altered in every way. Fixed seeds.
func TestFurtherRandomAlterations(t *testing.T) {
	tried := 0
	for kind, plan := range truthKinds {
		for seed := int64(3000); seed < 3015; seed++ {
			s := plan(seed)
			for n := range int64(4) {
				f := s.Figures[int(seed*7919+n*104729)%len(s.Figures)]
				for _, text := range alterations(f.Name, f.Text) {
					tried++
					if _, err := Check(s.with(f.Name, text)); err == nil && !sameFigure(f.Name+": "+f.Text+" -> "+text) {
						t.Errorf("%s, seed %d: passed: %s: %s -> %s", kind, seed, f.Name, f.Text, text)
					}
				}
			}
		}
	}
	t.Logf("%d alterations tried", tried)
}
