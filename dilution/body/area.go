package body

import (
	"math/big"
	"strings"

	"drawup/dilution/quantity"
	"drawup/dilution/roots"
)

// An Area is a published equation of body surface area. The zero value means
// "not given".
type Area int

// Equations of surface area. What is dosed by is Mosteller's ([Size.UsedSurface])
// unless somebody names another.
const (
	Mosteller Area = iota + 1
	DuBois
	Haycock
	GehanGeorge
	Boyd
)

// Areas lists the equations in the order of their use here.
func Areas() []Area { return []Area{Mosteller, DuBois, Haycock, GehanGeorge, Boyd} }

// String is the equation as papers and commands name it: "Du Bois 1916"; "" if
// not given.
func (a Area) String() string {
	switch a {
	case Mosteller:
		return "Mosteller 1987"
	case DuBois:
		return "Du Bois 1916"
	case Haycock:
		return "Haycock 1978"
	case GehanGeorge:
		return "Gehan-George 1970"
	case Boyd:
		return "Boyd" // no source seen gives a year
	}
	return ""
}

// AreaNamed reads a name of an equation in any letter case, with or without its
// year: "mosteller", "Du Bois 1916".
func AreaNamed(s string) (Area, bool) {
	plain := func(s string) string {
		return strings.NewReplacer(" ", "", "-", "").Replace(strings.ToLower(s))
	}
	for _, a := range Areas() {
		full := plain(a.String())
		if got := plain(s); got == full || got == strings.TrimRight(full, "0123456789") {
			return a, true
		}
	}
	return 0, false
}

// name is the equation as errors print it.
func (a Area) name() string {
	switch a {
	case Mosteller:
		return mostellerArea
	case DuBois:
		return duBoisArea
	case Haycock, GehanGeorge, Boyd:
		return "surface area (" + a.String() + ")"
	}
	return "surface area"
}

// Surface is the surface area by the equation a, to 40 significant digits, half
// up (rule R1), H in cm and W in kg:
//
//	Mosteller     root of H W / 3600
//	Du Bois       0.007184 H^0.725 W^0.425
//	Haycock       0.024265 H^0.3964 W^0.5378
//	Gehan-George  0.0235 H^0.42246 W^0.51456
//	Boyd          0.0003207 H^0.3 g^(0.7285 - 0.0188 log10 g), g = 1000 W
//
// It needs height and weight. Errors: *MissingError; *OutsideEquation for no
// equation.
func (s Size) Surface(a Area) (quantity.BodySurfaceArea, error) {
	if err := s.need(a.name(), NeedHeight, NeedWeight); err != nil {
		return quantity.BodySurfaceArea{}, err
	}
	switch a {
	case Mosteller:
		return s.Mosteller()
	case DuBois:
		return s.DuBois()
	case Haycock:
		return s.byPowers(rat(24265, 1000000), rat(3964, 10000), rat(5378, 10000))
	case GehanGeorge:
		return s.byPowers(rat(235, 10000), rat(42246, 100000), rat(51456, 100000))
	case Boyd:
		return s.boyd()
	}
	return quantity.BodySurfaceArea{}, &OutsideEquation{Equation: a.name(), Reason: "no equation is named"}
}

// byPowers is c H^h W^w.
func (s Size) byPowers(c, h, w *big.Rat) (quantity.BodySurfaceArea, error) {
	log := roots.LogOf(c).Plus(roots.LogOf(s.Height.Rat()).Times(h)).Plus(roots.LogOf(s.Weight.Rat()).Times(w))
	return quantity.SquareMetres(log.Number()), nil
}

// boyd goes by the weight in grams, whose power falls with its logarithm.
func (s Size) boyd() (quantity.BodySurfaceArea, error) {
	grams := roots.LogOf(mul(s.Weight.Rat(), rat(1000, 1)))
	power := sub(rat(7285, 10000), mul(rat(188, 10000), grams.Over(roots.LogOf(rat(10, 1)))))
	log := roots.LogOf(rat(3207, 10000000)).Plus(roots.LogOf(s.Height.Rat()).Times(rat(3, 10))).Plus(grams.Times(power))
	return quantity.SquareMetres(log.Number()), nil
}

// UsedSurfaceBy is the surface area by the equation a as it is printed and dosed
// by, rounded half up to 0.01 m² (rule R2). Errors are those of [Size.Surface].
func (s Size) UsedSurfaceBy(a Area) (quantity.BodySurfaceArea, error) {
	if a == Mosteller {
		return s.UsedSurface()
	}
	area, err := s.Surface(a)
	if err != nil {
		return area, err
	}
	return area.ToStep(rat(1, 100), quantity.HalfUp)
}
