package layouts

import (
	"sync"

	"drawup/labels/gs1"
	"drawup/layouts/ink"
)

// The symbols of labels are small Data Matrix symbols of one region. They are
// made here because a long job spends half its time on them when they are made
// for any size; larger ones come from the library, and a test holds the two
// against each other module by module. Clauses are those of ISO/IEC 16022.

// A matrix is one size of symbol: codewords of data and of error correction,
// and where each bit stands.
type matrix struct {
	side      int // of the modules within the border
	data, ecc int
	generator []byte  // of the error correction, without its leading one
	bits      []int16 // for each module 8*codeword + bit from the left, or one of the two below
	log       *[256]byte
	power     *[510]byte
}

const (
	alwaysDark  = -1
	alwaysLight = -2
	unset       = -3
)

// matrices are the square sizes of one region, the smallest first (table 7).
// They are worked out once and never change.
var matrices = sync.OnceValue(func() []matrix {
	power, log := field()
	var out []matrix
	for _, m := range []matrix{
		{side: 8, data: 3, ecc: 5}, {side: 10, data: 5, ecc: 7}, {side: 12, data: 8, ecc: 10},
		{side: 14, data: 12, ecc: 12}, {side: 16, data: 18, ecc: 14}, {side: 18, data: 22, ecc: 18},
		{side: 20, data: 30, ecc: 20}, {side: 22, data: 36, ecc: 24}, {side: 24, data: 44, ecc: 28},
	} {
		m.log, m.power = log, power
		m.bits = placement(m.side)
		m.generator = m.generate()
		out = append(out, m)
	}
	return out
})

// field is the field of 256 elements with the polynomial 100101101 (annex E):
// powers of its element 2, and their logarithms.
func field() (*[510]byte, *[256]byte) {
	var power [510]byte // twice over, for the sum of two logarithms
	var log [256]byte
	x := 1
	for i := range len(power) / 2 {
		power[i], power[i+255], log[x] = byte(x), byte(x), byte(i)
		if x <<= 1; x > 255 {
			x ^= 0x12D
		}
	}
	return &power, &log
}

func (m *matrix) times(a, b byte) byte {
	if a == 0 || b == 0 {
		return 0
	}
	return m.power[int(m.log[a])+int(m.log[b])]
}

// generate is the product of x - 2^i for i from 1 to ecc.
func (m *matrix) generate() []byte {
	g := make([]byte, m.ecc+1)
	g[0] = 1
	for i := 1; i <= m.ecc; i++ {
		for j := i; j > 0; j-- {
			g[j] ^= m.times(g[j-1], m.power[i])
		}
	}
	return g[1:]
}

// correct appends the codewords of error correction: the rest of a division
// by the generator.
func (m *matrix) correct(words []byte) []byte {
	rest := make([]byte, m.ecc)
	for _, w := range words {
		lead := w ^ rest[0]
		copy(rest, rest[1:])
		rest[m.ecc-1] = 0
		if lead == 0 {
			continue
		}
		for i, g := range m.generator {
			rest[i] ^= m.times(g, lead)
		}
	}
	return append(words, rest...)
}

// codewords encodes in the ASCII set: two digits to a codeword, FNC1 as it is
// (5.2.3). It is false for bytes that need another set.
func codewords(symbol []byte) ([]byte, bool) {
	digit := func(i int) bool { return i < len(symbol) && symbol[i] >= '0' && symbol[i] <= '9' }
	out := make([]byte, 0, 80)
	for i := 0; i < len(symbol); i++ {
		switch c := symbol[i]; {
		case digit(i) && digit(i+1):
			out = append(out, 130+10*(c-'0')+symbol[i+1]-'0')
			i++
		case c < 128:
			out = append(out, c+1)
		case c == gs1.Separator:
			out = append(out, c)
		default:
			return nil, false
		}
	}
	return out, true
}

// pad fills up to n codewords, the second and later ones in disorder (5.2.3,
// annex B.1).
func pad(words []byte, n int) []byte {
	for first := true; len(words) < n; first = false {
		filler := 129
		if !first {
			filler += (149*(len(words)+1))%253 + 1
			if filler > 254 {
				filler -= 254
			}
		}
		words = append(words, byte(filler))
	}
	return words
}

// smallMatrix gives the rows of the smallest symbol; false where that has more
// than one region or holds bytes that need another set.
func smallMatrix(symbol []byte) ([]string, bool) {
	words, ok := codewords(symbol)
	if !ok || len(symbol) == 0 || symbol[0] != gs1.Separator {
		return nil, false
	}
	all := matrices()
	for i := range all {
		if m := &all[i]; len(words) <= m.data {
			return m.draw(m.correct(pad(words, m.data))), true
		}
	}
	return nil, false
}

// draw sets the modules of all codewords within the border: solid on the left
// and at the foot, every other module dark at the top and on the right.
func (m *matrix) draw(words []byte) []string {
	n := m.side + 2
	out := make([]byte, n*n)
	for i := range out {
		out[i] = ink.Light
	}
	for i := range n {
		out[i*n], out[(n-1)*n+i] = ink.Dark, ink.Dark
		if i%2 == 0 {
			out[i] = ink.Dark
		} else {
			out[i*n+n-1] = ink.Dark
		}
	}
	for i, bit := range m.bits {
		if bit == alwaysDark || bit >= 0 && words[bit/8]>>(7-bit%8)&1 == 1 {
			out[(i/m.side+1)*n+i%m.side+1] = ink.Dark
		}
	}
	return rowsOf(string(out), n)
}

// rowsOf cuts a text into rows of n bytes that share its memory.
func rowsOf(text string, n int) []string {
	rows := make([]string, len(text)/n)
	for y := range rows {
		rows[y] = text[y*n : (y+1)*n]
	}
	return rows
}

// A cell is a module, counted from the top left, or from the other end where
// negative.
type cell struct{ row, col int }

// Shapes of a codeword, its bits from the left (annex F): the usual one about
// the module that ends it, and those of the four corners.
func usual() [8]cell {
	return [8]cell{{-2, -2}, {-2, -1}, {-1, -2}, {-1, -1}, {-1, 0}, {0, -2}, {0, -1}, {0, 0}}
}

func corner(which int) [8]cell {
	switch which {
	case 1:
		return [8]cell{{-1, 0}, {-1, 1}, {-1, 2}, {0, -2}, {0, -1}, {1, -1}, {2, -1}, {3, -1}}
	case 2:
		return [8]cell{{-3, 0}, {-2, 0}, {-1, 0}, {0, -4}, {0, -3}, {0, -2}, {0, -1}, {1, -1}}
	case 3:
		return [8]cell{{-3, 0}, {-2, 0}, {-1, 0}, {0, -2}, {0, -1}, {1, -1}, {2, -1}, {3, -1}}
	}
	return [8]cell{{-1, 0}, {-1, -1}, {0, -3}, {0, -2}, {0, -1}, {1, -3}, {1, -2}, {1, -1}}
}

// A walk is the placement of codewords on a square of n by n (annex F).
type walk struct {
	n    int
	bits []int16
	word int16
}

// inCorner places the next codeword in a corner.
func (w *walk) inCorner(which int) {
	for bit, c := range corner(which) {
		w.bits[(c.row+w.n)%w.n*w.n+(c.col+w.n)%w.n] = 8*w.word + int16(bit)
	}
	w.word++
}

// about places the next codeword so that it ends at row, col, unless that is
// outside or taken. What leaves the square on the left or at the top comes in
// again on the other side, shifted.
func (w *walk) about(row, col int) {
	if row < 0 || col < 0 || row >= w.n || col >= w.n || w.bits[row*w.n+col] != unset {
		return
	}
	for bit, c := range usual() {
		r, k := row+c.row, col+c.col
		if r < 0 {
			r, k = r+w.n, k+4-(w.n+4)%8
		}
		if k < 0 {
			r, k = r+4-(w.n+4)%8, k+w.n
		}
		w.bits[r*w.n+k] = 8*w.word + int16(bit)
	}
	w.word++
}

// placement says for each module of a square which bit it shows.
func placement(n int) []int16 {
	w := &walk{n: n, bits: make([]int16, n*n)}
	for i := range w.bits {
		w.bits[i] = unset
	}
	for row, col := 4, 0; row < n || col < n; row, col = row+3, col+1 {
		switch {
		case row == n && col == 0:
			w.inCorner(1)
		case row == n-2 && col == 0 && n%8 == 4:
			w.inCorner(3)
		case row == n-2 && col == 0 && n%4 != 0:
			w.inCorner(2)
		case row == n+4 && col == 2 && n%8 == 0:
			w.inCorner(4)
		}
		for ; row >= 0 && col < n; row, col = row-2, col+2 {
			w.about(row, col)
		}
		for row, col = row+1, col+3; row < n && col >= 0; row, col = row+2, col-2 {
			w.about(row, col)
		}
	}
	// Sizes whose modules are not a multiple of eight end in four fixed ones.
	if w.bits[n*n-1] == unset {
		w.bits[n*n-1], w.bits[n*n-n-2] = alwaysDark, alwaysDark
		w.bits[n*n-2], w.bits[n*n-n-1] = alwaysLight, alwaysLight
	}
	return w.bits
}
