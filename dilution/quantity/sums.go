package quantity

import "math/big"

// sameKind refuses two ways of counting, and a value that is not given.
func sameKind(got, want Kind) error {
	if got != want || got == 0 {
		return &KindError{Got: got, Want: want}
	}
	return nil
}

// In is the concentration when a is dissolved in the final volume v. Errors:
// *NotGivenError; *SyntaxError with ZeroOrLess if either is nothing.
func (a Amount) In(v Volume) (Concentration, error) {
	if !a.Given() || !v.Given() {
		return Concentration{}, &NotGivenError{What: "amount or final volume"}
	}
	if !a.x.positive() || !v.x.positive() {
		return Concentration{}, &SyntaxError{Got: a.x.text() + " in " + v.x.text() + " mL", Want: "an amount in a volume, both above zero", Why: "nothing divides by it", Code: ZeroOrLess}
	}
	return newConcentration(a.x.quo(v.x), a.kind, a.unit), nil
}

// DrawnAt is the volume that holds a at concentration c. Errors:
// *NotGivenError; *KindError.
func (a Amount) DrawnAt(c Concentration) (Volume, error) {
	if !a.Given() || !c.Given() {
		return Volume{}, &NotGivenError{What: "amount or concentration"}
	}
	if err := sameKind(a.kind, c.kind); err != nil {
		return Volume{}, err
	}
	return Volume{x: a.x.quo(c.x)}, nil
}

// Holds is the amount in v at concentration c. Error: *NotGivenError.
func (v Volume) Holds(c Concentration) (Amount, error) {
	if !v.Given() || !c.Given() {
		return Amount{}, &NotGivenError{What: "volume or concentration"}
	}
	return newAmount(v.x.mul(c.x), c.kind, c.unit), nil
}

// Plus is a + b. Error: *KindError if they are counted in unlike ways or one is
// not given.
func (a Amount) Plus(b Amount) (Amount, error) {
	if err := sameKind(a.kind, b.kind); err != nil {
		return Amount{}, err
	}
	return newAmount(a.x.add(b.x), a.kind, a.unit), nil
}

// Minus is a - b. Errors: *KindError if they are counted in unlike ways or one
// is not given; *SyntaxError with ZeroOrLess if b is more than a.
func (a Amount) Minus(b Amount) (Amount, error) {
	if err := sameKind(a.kind, b.kind); err != nil {
		return Amount{}, err
	}
	d := a.x.sub(b.x)
	if d.sign() < 0 {
		return Amount{}, &SyntaxError{Got: d.text(), Want: "an amount of zero or more", Why: "more taken than there is", Code: ZeroOrLess}
	}
	return newAmount(d, a.kind, a.unit), nil
}

// Times is n times a. It is not given if a is not, or if n is below zero.
func (a Amount) Times(n int) Amount {
	return newAmount(a.x.mul(notNegative(big.NewRat(int64(n), 1))), a.kind, a.unit)
}

// Scaled is a multiplied by the bare ratio r (another drug's share, a salt
// factor); the result is counted in unit u, which may be of another kind: the
// caller answers for the factor's source (rule R4). The ratio joins the base
// units: mg, units, mmol. The result is not given if a is not, or if r is nil
// or negative.
func (a Amount) Scaled(r *big.Rat, u Unit) Amount {
	return newAmount(a.x.mul(notNegative(r)), u.kind, u)
}

// Share is a divided by b. Errors: *KindError if they are counted in unlike
// ways or one is not given; *NotGivenError if b is nothing.
func (a Amount) Share(b Amount) (*big.Rat, error) {
	if err := sameKind(a.kind, b.kind); err != nil {
		return nil, err
	}
	if !b.x.positive() {
		return nil, &NotGivenError{What: "amount to divide by"}
	}
	return a.x.quo(b.x).r, nil
}

// Times is n times v. It is not given if v is not, or if n is below zero.
func (v Volume) Times(n int) Volume {
	return Volume{x: v.x.mul(notNegative(big.NewRat(int64(n), 1)))}
}

// Plus is v + w. It is not given if one of them is not.
func (v Volume) Plus(w Volume) Volume { return Volume{x: v.x.add(w.x)} }

// Minus is v - w. Errors: *NotGivenError; *SyntaxError with ZeroOrLess if w is
// more than v.
func (v Volume) Minus(w Volume) (Volume, error) {
	d := v.x.sub(w.x)
	if !d.given() {
		return Volume{}, &NotGivenError{What: "volume"}
	}
	if d.sign() < 0 {
		return Volume{}, &SyntaxError{Got: d.text() + " mL", Want: "a volume of zero or more", Why: "more taken than there is", Code: ZeroOrLess}
	}
	return Volume{x: d}, nil
}

// Containers is how many containers of volume each hold at least v, at most
// 10,000. Errors: *NotGivenError; *SyntaxError if it is more.
func (v Volume) Containers(each Volume) (int, error) {
	if !v.Given() || !each.x.positive() {
		return 0, &NotGivenError{What: "volume, or volume of a container,"}
	}
	n, err := v.x.toStep(each.x, Up)
	if err != nil {
		return 0, err
	}
	q := n.quo(each.x)
	if q.cmp(whole(10000)) > 0 {
		return 0, &SyntaxError{Got: q.text() + " containers", Want: "at most 10,000 containers", Why: "far more than a person opens", Code: TooManyDigit}
	}
	return int(q.r.Num().Int64()), nil
}

// Scaled is c multiplied by r; its unit stays. It is not given if c is not, or
// if r is nil, zero or negative.
func (c Concentration) Scaled(r *big.Rat) Concentration {
	return newConcentration(c.x.mul(notNegative(r)), c.kind, c.unit)
}
