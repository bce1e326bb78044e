package layouts

import (
	"fmt"
	"slices"
	"testing"
)

// The symbols made here are those of the library, module by module: every size
// of one region, codes of random letters and digits, separators within. The
// reader in the tests of printed pages is the second judge.
func TestSmallMatrixIsTheLibrarys(t *testing.T) {
	const letters = "0123456789ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz+-./%,:;<=>?_!\"&'()*\xe8"
	sizes := map[int]int{}
	seed := uint32(1)
	next := func(n int) int {
		seed = seed*1664525 + 1013904223
		return int(seed>>8) % n
	}
	for length := range 90 {
		for round := range 40 {
			symbol := []byte{0xE8}
			pool := letters
			if round%2 == 1 {
				pool = letters[:10] // digits only
			}
			for range length {
				symbol = append(symbol, pool[next(len(pool))])
			}
			want, err := libraryMatrix(symbol)
			if err != nil {
				t.Fatal(err)
			}
			got, ok := smallMatrix(symbol)
			if ok != (len(want) <= 26) {
				t.Fatalf("%q: got a small symbol %v for a side of %d", symbol, ok, len(want))
			}
			if ok && !slices.Equal(got, want) {
				t.Fatalf("%q: got\n%v\nwant\n%v", symbol, got, want)
			}
			sizes[len(want)]++
		}
	}
	for side := 10; side <= 26; side += 2 {
		if sizes[side] < 20 {
			t.Errorf("got %d symbols of side %d, want some", sizes[side], side)
		}
	}
	for _, symbol := range []string{"", "A", "\xe8\x80", "\xe8A\xff"} {
		if _, ok := smallMatrix([]byte(symbol)); ok {
			t.Errorf("%q: got a symbol, want it left to the library", symbol)
		}
	}
}

// ISO/IEC 16022, the worked example of annex O: "123456" in a symbol of 10 by
// 10 has data codewords 142, 164, 186 and error correction 114, 25, 5, 88, 102.
func TestWorkedExample(t *testing.T) {
	words, ok := codewords([]byte("123456"))
	m := matrices()[0]
	if got := fmt.Sprint(m.correct(pad(words, m.data))); !ok || got != "[142 164 186 114 25 5 88 102]" {
		t.Errorf("got %s", got)
	}
}
