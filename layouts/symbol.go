package layouts

import (
	"fmt"
	"image/color"

	"drawup/labels"
	"drawup/labels/gs1"
	"drawup/layouts/ink"

	"github.com/boombuler/barcode/datamatrix"
)

// A symbol is one form of a label's code, ready to be drawn as a GS1
// DataMatrix.
type symbol struct {
	bytes []byte
	side  int // in modules, without the quiet zone
}

// symbolsOf is every form of a label's code, the fullest first; none for a
// label without.
func symbolsOf(l labels.Label) ([]symbol, error) {
	var out []symbol
	for _, code := range l.Codes {
		elements, err := gs1.Parse(code.Text)
		if err != nil {
			return nil, err
		}
		bytes, again, err := gs1.Encode(elements)
		if err != nil {
			return nil, err
		}
		if again != code.Text {
			return nil, fmt.Errorf("got %q back from the code, want %q", again, code.Text)
		}
		side, err := sideOf(bytes)
		if err != nil {
			return nil, err
		}
		out = append(out, symbol{bytes, side})
	}
	return out, nil
}

// sideOf is the side of the smallest square symbol that holds the bytes in the
// ASCII set (ISO/IEC 16022, table 7).
func sideOf(bytes []byte) (int, error) {
	words, ok := codewords(bytes)
	if !ok {
		return 0, fmt.Errorf("got signs above 127 in %q, want none", bytes)
	}
	for _, size := range [...]struct{ side, data int }{
		{10, 3}, {12, 5}, {14, 8}, {16, 12}, {18, 18}, {20, 22}, {22, 30}, {24, 36}, {26, 44}, {32, 62}, {36, 86}, {40, 114}, {44, 144}, {48, 174}, {52, 204},
	} {
		if len(words) <= size.data {
			return size.side, nil
		}
	}
	return 0, fmt.Errorf("got %d codewords, want at most 204: a code as long as that is for no label", len(words))
}

// rows draws the symbol without its quiet zone.
func (s symbol) rows() ([]string, error) {
	rows, ok := smallMatrix(s.bytes)
	if !ok {
		var err error
		if rows, err = libraryMatrix(s.bytes); err != nil {
			return nil, err
		}
	}
	if len(rows) != s.side {
		return nil, fmt.Errorf("got a symbol of %d modules, want %d", len(rows), s.side)
	}
	return rows, nil
}

// libraryMatrix makes a symbol of any size.
func libraryMatrix(symbol []byte) ([]string, error) {
	code, err := datamatrix.Encode(string(symbol))
	if err != nil {
		return nil, err
	}
	side := code.Bounds()
	all := make([]byte, 0, side.Dx()*side.Dy())
	for y := side.Min.Y; y < side.Max.Y; y++ {
		for x := side.Min.X; x < side.Max.X; x++ {
			module := byte(ink.Light)
			if code.At(x, y) == color.Black {
				module = ink.Dark
			}
			all = append(all, module)
		}
	}
	return rowsOf(string(all), side.Dx()), nil
}
