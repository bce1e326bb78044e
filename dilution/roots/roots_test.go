package roots

import (
	"math/big"
	"testing"

	"pgregory.net/rapid"
)

func add(x, y *big.Rat) *big.Rat { return new(big.Rat).Add(x, y) }
func sub(x, y *big.Rat) *big.Rat { return new(big.Rat).Sub(x, y) }

// TestRoots holds every root to its definition: n - 1/2 <= root < n + 1/2 for
// the rounded one, compared as powers.
func TestRoots(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		k := rapid.SampledFrom([]int{2, 3, 5, 40}).Draw(t, "k")
		r := big.NewRat(rapid.Int64Range(1, 1<<60).Draw(t, "a"), rapid.Int64Range(1, 1<<30).Draw(t, "b"))
		n := new(big.Rat).SetInt(HalfUp(r, k))
		low, high := sub(n, big.NewRat(1, 2)), add(n, big.NewRat(1, 2))
		if low.Sign() > 0 && Power(low, int64(k)).Cmp(r) > 0 || Power(high, int64(k)).Cmp(r) <= 0 {
			t.Fatalf("root %d of %s: got %s", k, r, n)
		}
		x := Of(r, k)
		ulp := Shifted(big.NewRat(1, 2), -Digits+len(x.FloatString(0))) // at least half a unit of the last digit
		if Power(add(x, ulp), int64(k)).Cmp(r) <= 0 || Power(sub(x, ulp), int64(k)).Cmp(r) > 0 {
			t.Fatalf("root %d of %s to 40 digits: got %s", k, r, x)
		}
	})
}

func number(t *testing.T, s string) *big.Rat {
	t.Helper()
	r, ok := new(big.Rat).SetString(s)
	if !ok {
		t.Fatalf("%q is no number", s)
	}
	return r
}

// TestLogs compares with the decimal module of the Python standard library,
// worked there to 90 digits and rounded once to 40, half up.
func TestLogs(t *testing.T) {
	within := number(t, "0.00000000000000000000000000000000000001")
	for of, want := range map[string]string{
		"1": "0", "2": "0.6931471805599453094172321214581765680755", "10": "2.302585092994045684017991454684364207601",
		"0.001": "-6.907755278982137052053974364053092622803", "123456.789": "11.72364648718588098113995898391011158691",
		"0.6666": "-0.4055651131084977403133466154786361009688",
	} {
		got := new(big.Rat).SetFrac(LogOf(number(t, of)).value(), unit())
		if off := sub(got, number(t, want)); off.Abs(off).Cmp(within) > 0 {
			t.Errorf("log %s: got %s, want %s", of, got.FloatString(42), want)
		}
	}
}

// TestLogsBack holds what defines a logarithm: the number comes back, a product
// is a sum, and a whole power equals the same power by multiplication.
func TestLogsBack(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		r := big.NewRat(rapid.Int64Range(1, 1<<40).Draw(t, "a"), rapid.Int64Range(1, 1<<40).Draw(t, "b"))
		s := big.NewRat(rapid.Int64Range(1, 1<<20).Draw(t, "c"), 1000)
		if got := LogOf(r).Number(); got.Cmp(Of(r, 1)) != 0 {
			t.Fatalf("%s comes back as %s", r, got)
		}
		product := new(big.Rat).Mul(r, s)
		if got := LogOf(r).Plus(LogOf(s)).Number(); got.Cmp(Of(product, 1)) != 0 {
			t.Fatalf("%s x %s: got %s", r, s, got)
		}
		if got := LogOf(s).Times(big.NewRat(3, 1)).Number(); got.Cmp(Of(Power(s, 3), 1)) != 0 {
			t.Fatalf("%s cubed: got %s", s, got)
		}
		if got := LogOf(s).Times(big.NewRat(1, 2)).Number(); got.Cmp(Of(s, 2)) != 0 {
			t.Fatalf("root of %s: got %s", s, got)
		}
	})
}
