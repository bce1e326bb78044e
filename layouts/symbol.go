package layouts

import (
	"fmt"

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
	code, err := datamatrix.Encode(string(symbol))
	if err != nil {
		return nil, err
	}
	side := code.Bounds()
	rows := make([]string, 0, side.Dy())
	for y := side.Min.Y; y < side.Max.Y; y++ {
		row := make([]byte, 0, side.Dx())
		for x := side.Min.X; x < side.Max.X; x++ {
			if r, _, _, _ := code.At(x, y).RGBA(); r == 0 {
				row = append(row, ink.Dark)
			} else {
				row = append(row, ink.Light)
			}
		}
		rows = append(rows, string(row))
	}
	return rows, nil
}
