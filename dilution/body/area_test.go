package body

import (
	"errors"
	"math/big"
	"strings"
	"testing"

	"drawup/dilution/quantity"
)

// TestAreas holds published surface areas of the other equations to their last
// printed digit.
func TestAreas(t *testing.T) {
	for _, c := range []struct {
		id   string
		area Area
		want string
	}{
		{"A141", DuBois, "1.996"}, {"A142", Haycock, "2.007"}, {"A143", Boyd, "2.007"},
		{"Mosteller 180 cm 80 kg", Mosteller, "2.000"}, {"Gehan-George 180 cm 80 kg", GehanGeorge, "2.009"},
	} {
		a, err := sized(t, 0, "180", "80").Surface(c.area)
		if err != nil {
			t.Fatal(err)
		}
		printed(t, a.Rat(), c.want, c.id+", "+clinpk)
	}
}

// TestAreaDigits compares with the decimal module of the Python standard
// library, worked there to 90 digits by logarithms and rounded once to 40, half
// up.
func TestAreaDigits(t *testing.T) {
	for _, c := range []struct{ height, weight, haycock, gehan, boyd string }{
		{"180", "80", "2.006559820617422318623380411306162989236",
			"2.009482685470495310146777073817674158202", "2.00735548151416284303780667202880793673"},
		{"171", "72", "1.857861651202349850843380519556505017688",
			"1.862637783864163257487711909407539233038", "1.866394095483114774690533576348691865615"},
		{"161", "58.6", "1.623833178682789415618279667742650929142",
			"1.633250948811255786043426490716355049217", "1.637504867772283378344033118256100219065"},
		{"97", "16.8", "0.6784345282970565717378208770181199791736",
			"0.6932575262564382956768836762037244681533", "0.6992418411289905343145360183056186624313"},
		{"49", "3.2", "0.2121503145960666244993929787077101647599",
			"0.2213288722224065511003570185625331073869", "0.2166113990449760359207264746056623987112"},
		{"250", "400", "5.431397379613253888253160418812534094416",
			"5.284666524726280268788176315544065406527", "5.206907165465249483998991492335790596861"},
	} {
		s := sized(t, 0, c.height, c.weight)
		for area, want := range map[Area]string{Haycock: c.haycock, GehanGeorge: c.gehan, Boyd: c.boyd} {
			if a, err := s.Surface(area); err != nil || a.Exact() != want {
				t.Errorf("%v %s cm %s kg: got %s, %v, want %s", area, c.height, c.weight, a.Exact(), err, want)
			}
		}
	}
}

func TestAreaNames(t *testing.T) {
	for text, want := range map[string]Area{
		"mosteller": Mosteller, "Du Bois": DuBois, "dubois": DuBois, "DuBois 1916": DuBois, "haycock 1978": Haycock,
		"Gehan-George": GehanGeorge, "gehan george 1970": GehanGeorge, "BOYD": Boyd,
		"": 0, "mosteller 1988": 0, "bsa": 0, "1987": 0,
	} {
		if got, ok := AreaNamed(text); got != want || ok != (want != 0) {
			t.Errorf("%q: got %v, want %v", text, got, want)
		}
	}
	for _, a := range Areas() {
		if got, ok := AreaNamed(a.String()); !ok || got != a {
			t.Errorf("%v does not read back", a)
		}
		var missing *MissingError
		if _, err := (Size{}).Surface(a); !errors.As(err, &missing) || !strings.Contains(err.Error(), a.String()) {
			t.Errorf("%v: got %v, want the missing height named", a, err)
		}
	}
	if _, err := sized(t, 0, "180", "80").Surface(0); err == nil {
		t.Error("no equation gives a surface")
	}
}

// TestUsedSurfaceBy rounds half up to 0.01 m²; the exact values stand above.
func TestUsedSurfaceBy(t *testing.T) {
	for area, want := range map[Area]string{Mosteller: "1.85", DuBois: "1.84", Haycock: "1.86", GehanGeorge: "1.86", Boyd: "1.87"} {
		a, err := sized(t, 0, "171", "72").UsedSurfaceBy(area)
		if err != nil || a.Exact() != want {
			t.Errorf("%v: got %s, %v, want %s", area, a.Exact(), err, want)
		}
	}
	if _, err := (Size{Height: quantity.Centimetres(big.NewRat(1, 1))}).UsedSurfaceBy(Boyd); err == nil {
		t.Error("a surface without a weight")
	}
}
