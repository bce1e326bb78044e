package order

import (
	"fmt"
	"strings"

	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

const wantNumber = "a GTIN of 8, 12, 13 or 14 digits from the site's own GS1 company prefix"

// product reads one [[site.gtin]]. A number stands for one preparation and a
// preparation has one number.
func (r *reader) product(p productRecord, path []any) {
	out := Product{
		Number:        read(r, p.Number, parseNumber, at(path, "number")),
		Drug:          r.text(p.Drug, at(path, "drug")),
		Concentration: read(r, p.Concentration, quantity.ParseConcentration, at(path, "concentration")),
		Volume:        read(r, p.Volume, quantity.ParseVolume, at(path, "volume")),
		Pos:           r.places.Of(path...),
	}
	r.required(r.places.Has(at(path, "number")...), path, "number", "the GTIN", `number = "09521234000006"`)
	r.required(out.Drug.Given(), path, "drug", "the GTIN", `drug = "ephedrine"`)
	r.required(r.places.Has(at(path, "concentration")...), path, "concentration", "the GTIN", `concentration = "3 mg/mL"`)
	r.required(r.places.Has(at(path, "volume")...), path, "volume", "the GTIN", `volume = "10 mL"`)
	for _, other := range r.order.Site.Products {
		switch {
		case out.Number.Value != "" && out.Number.Value == other.Number.Value:
			r.refuse(at(path, "number"), refusal.Reason{Code: refusal.KeyRepeated, Got: out.Number.Text, Want: "a number of its own for each preparation",
				Message: fmt.Sprintf("the GTIN %s stands for two preparations", out.Number.Value), Remedy: "give one of the two its own number"})
		case sameProduct(out, other):
			r.refuse(at(path, "number"), refusal.Reason{Code: refusal.KeyConflict, Got: out.Number.Text, Want: "one number for a preparation",
				Message: fmt.Sprintf("the preparation has the GTIN %s already", other.Number.Value), Remedy: "take one of the two out"})
		}
	}
	r.order.Site.Products = append(r.order.Site.Products, out)
}

// sameProduct says whether two numbers are given to one preparation.
func sameProduct(a, b Product) bool {
	return a.Drug.Value != "" && strings.EqualFold(a.Drug.Value, b.Drug.Value) && a.Concentration.Value.Equal(b.Concentration.Value) &&
		a.Volume.Value.Given() && b.Volume.Value.Given() && a.Volume.Value.Cmp(b.Volume.Value) == 0
}

// A numberError says why a text is no GTIN of a site's own.
type numberError struct{ why string }

func (e *numberError) Error() string { return e.why }

// parseNumber reads a GTIN and fills it up to 14 digits with zeros in front. It
// refuses a check digit that does not fit (weights 3 and 1 from the right), and
// numbers that GS1 keeps for restricted circulation: they mean nothing under
// identifier 01 (GS1 General Specifications: prefixes 020 to 029, 040 to 049 and
// 200 to 299; of GTIN-8 000 to 099 and 200 to 299).
func parseNumber(s string) (string, error) {
	text := strings.TrimSpace(s)
	for _, c := range text {
		if c < '0' || c > '9' {
			return "", &numberError{fmt.Sprintf("%q is no digit", c)}
		}
	}
	switch len(text) {
	case 8, 12, 13, 14:
	default:
		return "", &numberError{fmt.Sprintf("it has %d digits", len(text))}
	}
	full := strings.Repeat("0", 14-len(text)) + text
	sum := 0
	for i, c := range full[:13] {
		sum += int(c-'0') * (3 - 2*(i%2))
	}
	if want := byte('0' + (10-sum%10)%10); full[13] != want {
		return "", &numberError{fmt.Sprintf("its check digit is %c and would be %c", full[13], want)}
	}
	if restricted(full) {
		return "", &numberError{"numbers that begin so are for use within one house and mean nothing under identifier 01"}
	}
	return full, nil
}

// restricted says whether a number of 14 digits belongs to restricted
// circulation.
func restricted(full string) bool {
	if short, ok := strings.CutPrefix(full, "000000"); ok {
		return short[0] == '0' || short[0] == '2'
	}
	prefix := full[1:4]
	return prefix[:2] == "02" || prefix[:2] == "04" || prefix[0] == '2'
}

// explain puts the fault into a reason, which is one of an empty text if it has
// a remedy already.
func (e *numberError) explain(r *refusal.Reason) {
	r.Want, r.Source = wantNumber, "GS1 General Specifications"
	if r.Remedy != "" {
		return
	}
	r.Code = refusal.ProductNumber
	r.Message = fmt.Sprintf("the number %q is not a GTIN that a label can carry: %s", r.Got, e.why)
	r.Remedy = "copy it from the site's own list of GTINs, or take the entry out: labels then carry none"
}
