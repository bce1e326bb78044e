package twostep

import (
	"math/big"

	"drawup/dilution/quantity"
	"drawup/dilution/syringe"
)

// A Mixture is one syringe after it was made up. All figures are exact.
type Mixture struct {
	Reading       syringe.Reading // the mark that it is made up to
	Diluent       quantity.Volume
	Amount        quantity.Amount
	Concentration quantity.Concentration
}

// A Plan is a dilution through an intermediate syringe, worked. Four syringes
// take part, each a new one: two that measure, the intermediate, the giving one.
type Plan struct {
	Draw         syringe.Reading // of the strength
	Intermediate Mixture
	Take         syringe.Reading // of the intermediate
	Final        Mixture

	// Error is how far the final concentration is off the target, in per cent of
	// it, below zero if it is weaker; not given by [Work].
	Error quantity.Percent

	// What stays in the intermediate syringe, to be thrown away.
	LeftVolume quantity.Volume
	LeftAmount quantity.Amount

	// Spread is the highest concentration that the four readings allow divided
	// by the lowest, every tolerance at its limit; the assay is not in it, and
	// would multiply it for every plan alike.
	Spread *big.Rat
}

// Readings are the four that make a [Plan].
type Readings struct {
	Draw, MakeUpTo, Take, Give syringe.Reading
}

// Work works the plan of four readings, whoever chose them: drawn of the
// strength, made up to in the intermediate syringe, taken of that, made up to in
// the giving syringe. Errors: *quantity.NotGivenError; *quantity.SyntaxError with
// ZeroOrLess where more is taken than there is; *OffLineError; *ImbalanceError.
func Work(strength quantity.Concentration, r Readings) (Plan, error) {
	p := Plan{Draw: r.Draw, Take: r.Take, Spread: big.NewRat(1, 1)}
	for _, one := range []syringe.Reading{r.Draw, r.MakeUpTo, r.Take, r.Give} {
		ratio, err := ratioOf(one)
		if err != nil {
			return Plan{}, err
		}
		p.Spread.Mul(p.Spread, ratio)
	}
	var err error
	if p.Intermediate, err = mixture(strength, r.Draw, r.MakeUpTo); err != nil {
		return Plan{}, err
	}
	if p.Final, err = mixture(p.Intermediate.Concentration, r.Take, r.Give); err != nil {
		return Plan{}, err
	}
	if p.LeftVolume, err = r.MakeUpTo.Volume.Minus(r.Take.Volume); err != nil {
		return Plan{}, err
	}
	if p.LeftAmount, err = p.LeftVolume.Holds(p.Intermediate.Concentration); err != nil {
		return Plan{}, err
	}
	return p, p.balance()
}

// mixture draws from strength and makes up.
func mixture(strength quantity.Concentration, drawn, made syringe.Reading) (Mixture, error) {
	m := Mixture{Reading: made}
	var err error
	if m.Diluent, err = made.Volume.Minus(drawn.Volume); err != nil {
		return Mixture{}, err
	}
	if m.Amount, err = drawn.Volume.Holds(strength); err != nil {
		return Mixture{}, err
	}
	m.Concentration, err = m.Amount.In(made.Volume)
	return m, err
}

// ratioOf is (v + tolerance) / (v - tolerance) of a reading on its lines.
func ratioOf(r syringe.Reading) (*big.Rat, error) {
	t := r.Barrel.Tolerance(r.Volume)
	if !t.Given() {
		return nil, missing("a reading that its syringe holds")
	}
	if line, _, err := r.Volume.ToStep(r.Barrel.Step(), quantity.HalfUp); err != nil || line.Cmp(r.Volume) != 0 || t.Cmp(r.Volume) >= 0 {
		return nil, &OffLineError{Volume: r.Volume, Barrel: r.Barrel}
	}
	v, off := r.Volume.Rat(), t.Rat()
	return new(big.Rat).Quo(new(big.Rat).Add(v, off), new(big.Rat).Sub(v, off)), nil
}

// balance holds drug drawn to drug taken on and drug left (rule R6).
func (p Plan) balance() error {
	sum, err := p.Final.Amount.Plus(p.LeftAmount)
	if err != nil {
		return err
	}
	if !sum.Equal(p.Intermediate.Amount) {
		return &ImbalanceError{Drawn: p.Intermediate.Amount, Taken: p.Final.Amount, Left: p.LeftAmount}
	}
	return nil
}

// offBy is c minus target in per cent of the target.
func offBy(c, target quantity.Concentration) quantity.Percent {
	x := new(big.Rat).Quo(c.Rat(), target.Rat())
	x.Sub(x, big.NewRat(1, 1))
	return quantity.PerCent(x.Mul(x, big.NewRat(100, 1)))
}
