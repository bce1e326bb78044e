package readback_test

import (
	"image"
	"image/color"
	"image/draw"
	"testing"

	"drawup/layouts/ink"
	"drawup/layouts/pdf/readback"

	"github.com/boombuler/barcode"
	"github.com/boombuler/barcode/datamatrix"
)

// picture draws a symbol of a public library, eight pixels a module, on white.
func picture(t *testing.T, content string) image.Image {
	t.Helper()
	code, err := datamatrix.Encode(content)
	if err != nil {
		t.Fatal(err)
	}
	side := 8 * code.Bounds().Dx()
	code, err = barcode.Scale(code, side, side)
	if err != nil {
		t.Fatal(err)
	}
	img := image.NewRGBA(image.Rect(0, 0, side+64, side+64))
	draw.Draw(img, img.Bounds(), image.White, image.Point{}, draw.Src)
	draw.Draw(img, image.Rect(32, 32, 32+side, 32+side), code, image.Point{}, draw.Src)
	return img
}

// The prefixes are the symbology identifiers of ISO/IEC 15424: ]d1 for a plain
// Data Matrix of ECC 200, ]d2 for one with FNC1 in first place.
func TestDecodeDataMatrix(t *testing.T) {
	for _, c := range []struct{ content, want string }{
		{"plain text", "]d1plain text"},
		{"\xe8911234", "]d2911234"},
		{"\xe891A\xe892B", "]d291A\x1d92B"},
		{"\xe891A\x1d92B", "]d291A\x1d92B"},
	} {
		got, err := readback.DecodeDataMatrix(picture(t, c.content))
		if err != nil || got != c.want {
			t.Errorf("%q: got %q, error %v, want %q", c.content, got, err, c.want)
		}
	}
}

func TestDecodeNothing(t *testing.T) {
	blank := image.NewRGBA(image.Rect(0, 0, 100, 100))
	draw.Draw(blank, blank.Bounds(), image.White, image.Point{}, draw.Src)
	if got, err := readback.DecodeDataMatrix(blank); err == nil {
		t.Errorf("got %q from a blank image, want an error", got)
	}
}

// At 254 dots per inch a dot is a tenth of a millimetre.
func TestCrop(t *testing.T) {
	img := image.NewRGBA(image.Rect(0, 0, 100, 50))
	img.Set(30, 20, color.RGBA{R: 9, A: 255})
	part := readback.Crop(img, 3000, 2000, 1000, 500, 254)
	if part.Bounds() != image.Rect(0, 0, 11, 6) || part.RGBAAt(0, 0).R != 9 {
		t.Errorf("got %v with corner %v, want 11x6 pixels whose corner is the marked one", part.Bounds(), part.RGBAAt(0, 0))
	}
	if part = readback.Crop(img, 9500, 0, 5000, 500, 254); part.Bounds().Dx() != 5 {
		t.Errorf("got %d pixels, want the five left on the page", part.Bounds().Dx())
	}
	if got := readback.At(img, 3050, 2050, 254); got != (ink.Colour{R: 9}) {
		t.Errorf("got %s, want the marked pixel", got)
	}
}
