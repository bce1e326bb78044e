package certainty

import (
	"fmt"
	"math/big"
	"strings"

	"drawup/dilution/quantity"
	"drawup/dilution/syringe"
)

// An Interval is where a concentration lies.
type Interval struct {
	Low, High quantity.Concentration
}

// Spread is the high end divided by the low one: what is compared when two
// preparations of one concentration are; nil for the zero Interval.
func (i Interval) Spread() *big.Rat {
	if !i.Low.Given() || !i.High.Given() {
		return nil
	}
	return new(big.Rat).Quo(i.High.Rat(), i.Low.Rat())
}

// A Contribution is what one input, or one syringe that is read more than once,
// adds to the interval.
type Contribution struct {
	Sources   []Source
	HalfWidth quantity.Percent // of the concentration, either way, by this alone
	Share     quantity.Percent // of the square of U
}

// String names the sources: "volume drawn in step 1, 1 mL in a 2 mL syringe",
// joined by "and" where one syringe is read more than once.
func (c Contribution) String() string {
	var names []string
	for _, s := range c.Sources {
		names = append(names, s.String())
	}
	return strings.Join(names, " and ")
}

// A Result is how sure a concentration is.
type Result struct {
	// Stated is the concentration that the volumes of the plan give, as the
	// label says it. Best is the one at the middle of all limits; it differs from
	// Stated only where assay limits or a fill are not even around their figure.
	Stated, Best quantity.Concentration

	Worst Interval // every error at its limit, all at once
	GUM   Interval // Best (1 - U) to Best (1 + U), never beyond Worst

	// FirstOrder reports that the errors are small enough for that sum. Where
	// they are not, GUM is Worst.
	FirstOrder bool

	// Expanded is U in per cent of Best, rounded up at the tenth decimal.
	Expanded quantity.Percent

	// Printed is the single half width that paper prints, by the rule of
	// [syringe.Interval]; the package comment says where it is today's figure.
	Printed quantity.Percent

	// Contributions are in the order of the preparation, those of no width left
	// out. Largest is the widest; of equal ones the first; the zero Contribution
	// if there is none.
	Contributions []Contribution
	Largest       Contribution

	// NotCovered names what has no known limits: the interval leaves it out.
	NotCovered []Part
}

// Of works the interval of a preparation. Errors: *quantity.NotGivenError for
// what is missing; *PreparationError for a reading that its barrel cannot show, limits
// in the wrong order, or a step that takes more than there is.
func Of(p Preparation) (Result, error) {
	if !p.Strength.Given() {
		return Result{}, missing("the strength")
	}
	content, err := assay(p.Assay)
	if err != nil {
		return Result{}, err
	}
	chain, err := p.chain()
	if err != nil {
		return Result{}, err
	}
	at := func(c corner) quantity.Concentration {
		x := new(big.Rat).Set(content.at(c))
		for _, f := range chain {
			x.Mul(x, f.at(c))
		}
		return p.Strength.Scaled(x)
	}
	r := Result{Stated: at(stated), Best: at(middle), Worst: Interval{at(lowest), at(highest)}}
	widths := []width{{content.source, new(big.Rat).Quo(content.half(), content.middle())}}
	for _, f := range chain {
		widths = append(widths, f.widths()...)
		for _, x := range f.inputs() {
			if !x.known {
				r.NotCovered = append(r.NotCovered, x.source.Part)
			}
		}
	}
	return r.combine(widths)
}

// chain is the factor of every step, checked for taking more than there is.
func (p Preparation) chain() ([]factor, error) {
	chain, err := mixing(p.Powder)
	if err != nil {
		return nil, err
	}
	var before *big.Rat // volume that the last step made
	for i, s := range p.Steps {
		if s.way == 0 {
			return nil, missing(fmt.Sprintf("how step %d dilutes", i+1))
		}
		f, err := s.factor(i + 1)
		if err != nil {
			return nil, err
		}
		took, makes := sum(f.drawn, stated), f.volume(stated)
		if before != nil && took.Cmp(before) > 0 {
			return nil, wrong(f.drawn[0].source, exactly(took), "at most "+exactly(before)+", what the step before makes")
		}
		if took.Cmp(makes) > 0 {
			return nil, wrong(f.plus[0].source, exactly(makes), "at least "+exactly(took)+", what is drawn")
		}
		before = makes
		chain = append(chain, f)
	}
	return chain, nil
}

// combine adds the widths up.
func (r Result) combine(widths []width) (Result, error) {
	groups := grouped(widths)
	var shares []*big.Rat
	var parts []quantity.Percent
	for _, g := range groups {
		shares = append(shares, share(g.HalfWidth))
		parts = append(parts, g.HalfWidth)
	}
	square := expandedSquare(shares)
	for i := range groups {
		own := expandedSquare(shares[i : i+1])
		groups[i].Share = perCent(own.Quo(own, square))
		if i == 0 || groups[i].HalfWidth.Rat().Cmp(r.Largest.HalfWidth.Rat()) > 0 {
			r.Largest = groups[i]
		}
	}
	r.Contributions = groups
	var err error
	if r.Printed, err = syringe.Interval(parts...); err != nil {
		return Result{}, err
	}
	u := rootUp(square)
	r.Expanded = perCent(u)
	r.FirstOrder = small(widths, square)
	if !r.FirstOrder {
		r.GUM = r.Worst
		return r, nil
	}
	one := big.NewRat(1, 1)
	if r.GUM.Low, err = extreme(r.Worst.Low, r.Best.Scaled(new(big.Rat).Sub(one, u)), 1); err != nil {
		return Result{}, err
	}
	r.GUM.High, err = extreme(r.Worst.High, r.Best.Scaled(new(big.Rat).Add(one, u)), -1)
	return r, err
}

// How large U may be for a sum of first order: of everything, and of the
// volumes that are divided by alone, in per cent. GUM 5.1.2 (note) wants more
// terms where the sum is far from straight, and names no number; these are our
// own, found by simulation: inside them at least 95 % of results lie within U.
const (
	firstOrder        = 50
	firstOrderDivided = 20
)

// small reports whether a sum of first order will do. Squares are compared, so
// that no root takes part.
func small(widths []width, square *big.Rat) bool {
	var divided []width
	for _, w := range widths {
		switch w.source.Part {
		case PowderFluid, Displacement, FinalVolume, DiluentAdded, BagFill:
			divided = append(divided, w)
		case Assay, DrugDrawn, FluidRemoved:
		}
	}
	var shares []*big.Rat
	for _, g := range grouped(divided) {
		shares = append(shares, share(g.HalfWidth))
	}
	within := func(square *big.Rat, limit int64) bool { return square.Cmp(big.NewRat(limit*limit, 100*100)) <= 0 }
	return within(square, firstOrder) && within(expandedSquare(shares), firstOrderDivided)
}

// extreme is the larger of two ends with sign 1, the smaller with -1.
func extreme(worst, end quantity.Concentration, sign int) (quantity.Concentration, error) {
	n, err := end.Cmp(worst)
	if err != nil || n*sign <= 0 {
		return worst, err
	}
	return end, nil
}

// grouped adds up plainly the widths of readings of one syringe, and drops
// those of no width.
func grouped(widths []width) []Contribution {
	var out []Contribution
	at := map[string]int{} // by the syringe's name
	for _, w := range widths {
		if w.share.Sign() == 0 {
			continue
		}
		name := w.source.Reading.Syringe
		i, seen := at[name]
		if name == "" || !seen {
			i = len(out)
			out = append(out, Contribution{HalfWidth: perCent(new(big.Rat))})
		}
		if name != "" {
			at[name] = i
		}
		g := &out[i]
		g.Sources = append(g.Sources, w.source)
		g.HalfWidth = quantity.PerCent(new(big.Rat).Add(g.HalfWidth.Rat(), perCent(w.share).Rat()))
	}
	return out
}
