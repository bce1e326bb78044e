package layouts

import (
	"fmt"
	"image/color"

	"drawup/labels/gs1"
	"drawup/layouts/ink"

	"github.com/boombuler/barcode/datamatrix"
)

// dataMatrix turns the human-readable form of a code into the rows of a GS1
// DataMatrix without its quiet zone.
func dataMatrix(hri string) ([]string, error) {
	elements, err := gs1.Parse(hri)
	if err != nil {
		return nil, err
	}
	symbol, again, err := gs1.Encode(elements)
	if err != nil {
		return nil, err
	}
	if again != hri {
		return nil, fmt.Errorf("got %q back from the code, want %q", again, hri)
	}
	if rows, ok := smallMatrix(symbol); ok {
		return rows, nil
	}
	return libraryMatrix(symbol)
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
