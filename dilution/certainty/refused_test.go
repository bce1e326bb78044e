package certainty

import (
	"errors"
	"math/big"
	"strings"
	"testing"

	"drawup/dilution/quantity"
)

// TestRefused refuses what is missing and what cannot be, and says where.
func TestRefused(t *testing.T) {
	strength, five := conc(t, "10 mg/mL"), Around(per(t, "5"))
	one, full := in(t, "1", "2"), in(t, "10", "10")
	bag := Fill{Stated: mL(t, "100")}
	steps := func(s ...Step) Preparation { return Preparation{Strength: strength, Assay: five, Steps: s} }
	powder := func(p Powder) Preparation { return Preparation{Strength: strength, Assay: five, Powder: &p} }
	own := Fill{Stated: mL(t, "0.2")}
	between := Measured{Volume: mL(t, "1.05"), Barrel: one.Barrel}
	over := Measured{Volume: mL(t, "3"), Barrel: one.Barrel}
	for name, c := range map[string]struct {
		told    Preparation
		missing bool
		says    string
	}{
		"no strength":           {Preparation{Assay: five}, true, "strength"},
		"no assay limits":       {Preparation{Strength: strength}, true, "assay limits"},
		"assay around nothing":  {Preparation{Strength: strength, Assay: Around(quantity.Percent{})}, true, "assay limits"},
		"assay upside down":     {Preparation{Strength: strength, Assay: Limits{per(t, "110"), per(t, "90")}}, false, "110 % to 90 %"},
		"assay down to nothing": {Preparation{Strength: strength, Assay: Around(per(t, "100"))}, false, "above 0 %"},
		"no step":               {steps(Step{}), true, "how step 1 dilutes"},
		"nothing drawn":         {steps(MakeUpTo(full)), true, "volume drawn in step 1"},
		"no volume":             {steps(MakeUpTo(full, Measured{Barrel: one.Barrel})), true, "volume drawn in step 1"},
		"no syringe":            {steps(MakeUpTo(full, Measured{Volume: one.Volume})), true, "syringe for the volume drawn in step 1"},
		"between the lines":     {steps(MakeUpTo(full, between)), false, "got 1.05 mL, want a multiple of 0.1 mL"},
		"over the syringe":      {steps(MakeUpTo(full, over)), false, "got 3 mL, want above 0 mL and at most 2 mL"},
		"tolerance of itself":   {steps(MakeUpTo(full, in(t, "0.01", "1"))), false, "more than its tolerance of 0.0152 mL"},
		"final below the drawn": {steps(MakeUpTo(one, full)), false, "got 1 mL, want at least 10 mL, what is drawn"},
		"more than there is":    {steps(MakeUpTo(in(t, "2", "2"), one), MakeUpTo(full, in(t, "3", "5"))), false, "volume drawn in step 2, 3 mL in a 5 mL syringe: got 3 mL, want at most 2 mL"},
		"no diluent":            {steps(AddDiluent(nil, one)), true, "diluent added in step 1"},
		"no bag":                {steps(AddToBag(Fill{}, one)), true, "fill of the bag in step 1"},
		"one limit of a bag":    {steps(AddToBag(Fill{Stated: mL(t, "100"), Most: mL(t, "110")}, one)), true, "other limit of the fill of the bag"},
		"bag upside down":       {steps(AddToBag(Fill{mL(t, "100"), mL(t, "110"), mL(t, "105")}, one)), false, "got 110 mL at least, want no more than 105 mL"},
		"empty bag":             {steps(AddToBag(Fill{Stated: own.Stated, Least: zero(), Most: own.Stated}, one)), false, "want a volume above zero"},
		"nothing withdrawn":     {steps(WithdrawThenAdd(bag, nil, one)), true, "volume withdrawn in step 1"},
		"more than the bag":     {steps(WithdrawThenAdd(Fill{Stated: mL(t, "10")}, []Measured{full}, one)), false, "up to 10.4 mL, want no more than the bag holds, 10 mL"},
		"powder, no fluid":      {powder(Powder{Displaced: own}), true, "fluid added to the powder"},
		"powder, no own volume": {powder(Powder{Added: full}), true, "volume of the powder"},
	} {
		_, err := Of(c.told)
		var not *quantity.NotGivenError
		var cannot *PreparationError
		if c.missing != errors.As(err, &not) || !c.missing != errors.As(err, &cannot) || !strings.Contains(err.Error(), c.says) {
			t.Errorf("%s: got %v, want it refused with %q", name, err, c.says)
		}
	}
}

func zero() quantity.Volume { return quantity.Millilitres(new(big.Rat)) }

// TestCompare sets one step against two, by the worked values of the reference:
// the second step of 1 in 10 makes u 5.97 % of 4.69 %.
func TestCompare(t *testing.T) {
	drug, final := in(t, "1", "2"), in(t, "10", "10")
	step := MakeUpTo(final, drug)
	one := of(t, Preparation{Strength: conc(t, "1 mg/mL"), Assay: Around(per(t, "5")), Steps: []Step{step}})
	two := of(t, Preparation{Strength: conc(t, "10 mg/mL"), Assay: Around(per(t, "5")), Steps: []Step{step, step}})
	if !one.Stated.Equal(two.Stated) {
		t.Fatal("the two are not of one concentration")
	}
	for name, c := range map[string]struct {
		a, b Result
		want Comparison
	}{"one against two": {one, two, Comparison{-1, -1}}, "two against one": {two, one, Comparison{1, 1}}, "itself": {one, one, Comparison{}}} {
		if got, err := Compare(c.a, c.b); err != nil || got != c.want {
			t.Errorf("%s: got %v, %v, want %v", name, got, err, c.want)
		}
	}
	var not *quantity.NotGivenError
	if _, err := Compare(one, Result{}); !errors.As(err, &not) {
		t.Errorf("got %v, want the zero result refused", err)
	}
	if low, high := (Result{}).Reach(one.GUM); low.Given() || high.Given() {
		t.Error("the zero result reaches somewhere")
	}
}

// TestLargest names the contributor in words: the least volume of a 1 mL
// syringe, 17 %, before an assay of 10 % and two final volumes of 4 %; then one
// syringe that is read twice, 16 % and 4 %, worked by hand from ISO 7886-1.
func TestLargest(t *testing.T) {
	p := Preparation{Strength: conc(t, "10 mg/mL"), Assay: Around(per(t, "10")), Steps: []Step{
		MakeUpTo(in(t, "10", "10"), in(t, "1", "2")), MakeUpTo(in(t, "50", "50"), in(t, "0.1", "1"))}}
	if got := of(t, p).Largest.String(); got != "volume drawn in step 2, 0.1 mL in a 1 mL syringe" {
		t.Errorf("got %q", got)
	}
	p.Steps = []Step{MakeUpTo(named(t, "10", "10", "it"), named(t, "1", "10", "it"))}
	r := of(t, p)
	if got := r.Largest; got.HalfWidth.Exact() != "20" ||
		got.String() != "volume drawn in step 1, 1 mL in a 10 mL syringe and final volume in step 1, 10 mL in a 10 mL syringe" {
		t.Errorf("got %s, %s %%", got, got.HalfWidth.Exact())
	}
	p = Preparation{Strength: conc(t, "10 mg/mL"), Assay: Around(per(t, "10"))}
	if got := of(t, p).Largest.String(); got != "assay limits of the presentation" {
		t.Errorf("got %q", got)
	}
	p.Assay = Around(zeroPercent())
	if r := of(t, p); len(r.Largest.Sources) != 0 || !r.GUM.Low.Equal(r.GUM.High) {
		t.Errorf("got %s of an exact strength, want nothing", r.Largest)
	}
}
