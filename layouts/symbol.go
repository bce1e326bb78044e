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
	code, err := datamatrix.Encode(string(symbol))
	if err != nil {
		return nil, err
	}
	side := code.Bounds()
	w, h := side.Dx(), side.Dy()
	all := make([]byte, 0, w*h)
	for y := side.Min.Y; y < side.Max.Y; y++ {
		for x := side.Min.X; x < side.Max.X; x++ {
			module := byte(ink.Light)
			if code.At(x, y) == color.Black {
				module = ink.Dark
			}
			all = append(all, module)
		}
	}
	// The rows share one string.
	text := string(all)
	rows := make([]string, h)
	for y := range rows {
		rows[y] = text[y*w : (y+1)*w]
	}
	return rows, nil
}
