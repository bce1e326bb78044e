package salts

import (
	"fmt"
	"math/big"
	"strings"
)

// weights are the IUPAC abridged standard atomic weights of 2021 (see
// [AtomicWeights]) in 0.00001 g/mol, of the elements that drugs are made of.
func weights() map[string]int64 {
	return map[string]int64{
		"H": 100800, "C": 1201100, "N": 1400700, "O": 1599900, "F": 1899840, "Na": 2298977, "Mg": 2430500,
		"P": 3097376, "S": 3206000, "Cl": 3545000, "K": 3909830, "Ca": 4007800, "Fe": 5584500, "Br": 7990400,
		"I": 12690447,
	}
}

// MolarMass is the molar mass in g/mol of a formula whose parts are parted by
// points, each with a count in front of it: "MgSO4.7H2O", "Ca(C6H11O7)2".
func MolarMass(formula string) (*big.Rat, error) {
	var total int64
	for _, part := range strings.Split(formula, ".") {
		r := formulaReader{text: part, whole: formula}
		n := r.count()
		sum, err := r.group(0)
		if err != nil {
			return nil, err
		}
		if r.at < len(part) || sum == 0 {
			return nil, fmt.Errorf("got the formula %q, want atoms with their counts, parts parted by points", formula)
		}
		total += n * sum
	}
	return big.NewRat(total, 100000), nil
}

// formulaReader reads one part of a formula.
type formulaReader struct {
	text, whole string
	at          int
}

// count is the number at hand, 1 when there is none.
func (r *formulaReader) count() int64 {
	var n int64
	begin := r.at
	for r.at < len(r.text) && r.text[r.at] >= '0' && r.text[r.at] <= '9' && r.at-begin < 4 {
		n = n*10 + int64(r.text[r.at]-'0')
		r.at++
	}
	if r.at == begin {
		return 1
	}
	return n
}

// group is the mass of atoms up to the end or a closing bracket. Brackets nest
// three deep at most.
func (r *formulaReader) group(depth int) (int64, error) {
	var sum int64
	for r.at < len(r.text) && r.text[r.at] != ')' {
		var one int64
		if r.text[r.at] == '(' && depth < 3 {
			r.at++
			inner, err := r.group(depth + 1)
			if err != nil {
				return 0, err
			}
			if r.at >= len(r.text) {
				return 0, fmt.Errorf("got the formula %q, want each bracket closed", r.whole)
			}
			r.at++
			one = inner
		} else {
			w, err := r.atom()
			if err != nil {
				return 0, err
			}
			one = w
		}
		sum += one * r.count()
	}
	return sum, nil
}

func (r *formulaReader) atom() (int64, error) {
	for _, n := range []int{2, 1} {
		if r.at+n <= len(r.text) {
			if w, ok := weights()[r.text[r.at:r.at+n]]; ok {
				r.at += n
				return w, nil
			}
		}
	}
	return 0, fmt.Errorf("got %q in the formula %q, want an element whose weight is on record", r.text[r.at:], r.whole)
}
