package twostep

import (
	"errors"
	"math/big"
	"strings"
	"testing"

	"drawup/dilution/quantity"
	"drawup/dilution/syringe"
)

// TestRefused refuses what is missing, what contradicts itself and what cannot
// be found, with the figures behind it.
func TestRefused(t *testing.T) {
	nothing := quantity.Millilitres(new(big.Rat))
	var apart []syringe.Barrel // lines in thirds, sevenths and so on share no grid
	for _, part := range []int64{3, 7, 11, 13, 17} {
		b, err := syringe.New(mL(t, "50"), quantity.Millilitres(big.NewRat(1, part)), "invented for this test")
		if err != nil {
			t.Fatal(err)
		}
		apart = append(apart, b)
	}
	for name, c := range map[string]struct {
		change func(w *Wanted)
		want   error
		says   string
	}{
		"no strength":       {func(w *Wanted) { w.Strength = quantity.Concentration{} }, &quantity.NotGivenError{}, "the strength"},
		"no volume":         {func(w *Wanted) { w.Volume = quantity.Volume{} }, &quantity.NotGivenError{}, "the final volume"},
		"volume of nothing": {func(w *Wanted) { w.Volume = nothing }, &quantity.SyntaxError{}, "both above zero"},
		"no target":         {func(w *Wanted) { w.Concentration = quantity.Concentration{} }, &quantity.NotGivenError{}, "a concentration or an amount"},
		"no smallest":       {func(w *Wanted) { w.Smallest = quantity.Volume{} }, &quantity.NotGivenError{}, "the smallest measurable volume"},
		"no tolerance":      {func(w *Wanted) { w.Tolerance = quantity.Percent{} }, &quantity.NotGivenError{}, "how far"},
		"tolerance of 200":  {func(w *Wanted) { w.Tolerance = per(t, "200") }, &quantity.NotGivenError{}, "0 % to 100 %"},
		"other kind":        {func(w *Wanted) { w.Concentration = conc(t, "1 units/mL") }, &quantity.KindError{}, "rule R4"},
		"bound, other kind": {func(w *Wanted) { w.High = conc(t, "1 units/mL") }, &quantity.KindError{}, "rule R4"},
		"bounds crossed": {func(w *Wanted) { w.Low, w.High = conc(t, "2 mg/mL"), conc(t, "1 mg/mL") }, &BoundsError{},
			"got an intermediate of at least 2 mg/mL, want no more than its upper bound, 1 mg/mL"},
		"amount disagrees": {func(w *Wanted) { w.Amount = amountOf(t, "2 mg") }, &DisagreeError{},
			"got 2 mg in 10 mL and 0.02 mg/mL, want an amount and a concentration that agree"},
		"as strong":           {func(w *Wanted) { w.Concentration = w.Strength }, &NotWeakerError{}, "got a target of 10 mg/mL, want less than the strength, 10 mg/mL"},
		"no line at it":       {func(w *Wanted) { w.Volume = mL(t, "10.1") }, &UnreadableError{}, "such as 10 mL"},
		"no syringe holds it": {func(w *Wanted) { w.Volume = mL(t, "60") }, &UnreadableError{}, "holds and shows"},
		"giving chosen": {func(w *Wanted) {
			w.Giving, w.Volume = []syringe.Barrel{barrelOf(t, "20", "1")}, mL(t, "9.8")
		}, &UnreadableError{}, "such as 10 mL"},
		"final below smallest": {func(w *Wanted) { w.Smallest = mL(t, "11") }, &syringe.BelowSmallest{}, "at least 11 mL"},
		"no barrels": {func(w *Wanted) { w.Giving, w.Barrels = w.Barrels, nil }, &NoneError{},
			"got no intermediate dilution within 5 %, want one"},
		"too weak":       {func(w *Wanted) { w.Concentration = conc(t, "1 nanogram/mL") }, &NoneError{}, "% off"},
		"bounds too low": {func(w *Wanted) { w.High = conc(t, "0.001 mg/mL") }, &NoneError{}, "within 5 %"},
		"too many lines": {func(w *Wanted) { w.Barrels = append(w.Barrels, barrelOf(t, "50", "0.001")) }, &TooFineError{}, "at most 20000 in all"},
		"no grid":        {func(w *Wanted) { w.Barrels = append(w.Barrels, apart...) }, &TooFineError{}, "share no grid"},
	} {
		w := wanted(t, "10 mg/mL", "0.02 mg/mL", "10")
		c.change(&w)
		f, err := Find(w)
		if err == nil || !sameType(err, c.want) || !strings.Contains(err.Error(), c.says) {
			t.Errorf("%s: got %+v, %v, want a %T with %q", name, f.Plan, err, c.want, c.says)
		}
	}
}

func sameType(got, want error) bool {
	switch want.(type) {
	case *quantity.NotGivenError:
		return as[*quantity.NotGivenError](got)
	case *quantity.SyntaxError:
		return as[*quantity.SyntaxError](got)
	case *quantity.KindError:
		return as[*quantity.KindError](got)
	case *syringe.BelowSmallest:
		return as[*syringe.BelowSmallest](got)
	case *BoundsError:
		return as[*BoundsError](got)
	case *DisagreeError:
		return as[*DisagreeError](got)
	case *NotWeakerError:
		return as[*NotWeakerError](got)
	case *UnreadableError:
		return as[*UnreadableError](got)
	case *NoneError:
		return as[*NoneError](got)
	case *TooFineError:
		return as[*TooFineError](got)
	}
	return false
}

func as[E error](err error) bool {
	var e E
	return errors.As(err, &e)
}

func amountOf(t failing, s string) quantity.Amount {
	t.Helper()
	a, err := quantity.ParseAmount(s)
	if err != nil {
		t.Fatal(err)
	}
	return a
}

// TestWorkRefuses refuses readings that cannot be: none, between the lines, more
// made of less, more taken than there is.
func TestWorkRefuses(t *testing.T) {
	good := Readings{read(t, "1", "1"), read(t, "10", "10"), read(t, "2", "2"), read(t, "20", "20")}
	if _, err := Work(conc(t, "10 mg/mL"), good); err != nil {
		t.Fatal(err)
	}
	none, between, over, more := good, good, good, good
	none.Take = syringe.Reading{}
	between.Draw.Volume = mL(t, "0.995")
	over.MakeUpTo = read(t, "0.5", "1")
	more.Take = read(t, "15", "20")
	for name, c := range map[string]struct {
		readings Readings
		want     error
	}{"none": {none, &quantity.NotGivenError{}}, "made up to less": {over, &quantity.SyntaxError{}}, "more than there is": {more, &quantity.SyntaxError{}}} {
		if _, err := Work(conc(t, "10 mg/mL"), c.readings); !sameType(err, c.want) {
			t.Errorf("%s: got %v, want a %T", name, err, c.want)
		}
	}
	var off *OffLineError
	if _, err := Work(conc(t, "10 mg/mL"), between); !errors.As(err, &off) || !strings.Contains(err.Error(), "got 0.995 mL in a 1 mL syringe, want a multiple of 0.01 mL") {
		t.Errorf("between the lines: got %v", err)
	}
	if _, err := Work(quantity.Concentration{}, good); !as[*quantity.NotGivenError](err) {
		t.Errorf("no strength: got %v", err)
	}
}
