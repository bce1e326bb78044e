package readback

import (
	"image"
	"image/draw"
	"strings"

	"drawup/layouts/ink"

	"github.com/klippa-app/go-pdfium/requests"
	"github.com/makiuchi-d/gozxing"
	"github.com/makiuchi-d/gozxing/datamatrix"
)

// Render draws a page at the given dots per inch on white. A page of A4 at
// 300 takes 35 megabytes, at 600 four times that.
func (f *File) Render(page, dpi int) *image.RGBA {
	f.t.Helper()
	got, err := f.renderer.RenderPageInDPI(&requests.RenderPageInDPI{Page: f.page(page), DPI: dpi})
	f.must("rendering", err)
	defer got.Cleanup()
	// The renderer's pixels are gone after the clean-up.
	return copied(got.Result.RenderedImage, got.Result.RenderedImage.Bounds())
}

// Crop cuts a part of a rendered page out, given in micrometres of paper; the
// part is widened to whole pixels and narrowed to the page. Its corner is
// 0, 0.
func Crop(img image.Image, x, y, w, h ink.Micrometre, dpi int) *image.RGBA {
	box := image.Rect(pixel(x, dpi), pixel(y, dpi), pixel(x+w, dpi)+1, pixel(y+h, dpi)+1)
	return copied(img, box.Intersect(img.Bounds()))
}

// At returns the colour of a rendered page at a place on paper.
func At(img *image.RGBA, x, y ink.Micrometre, dpi int) ink.Colour {
	c := img.RGBAAt(pixel(x, dpi), pixel(y, dpi))
	return ink.Colour{R: c.R, G: c.G, B: c.B}
}

// pixel is the number of the pixel in which a length ends.
func pixel(v ink.Micrometre, dpi int) int { return int(v) * dpi / 25400 }

func copied(img image.Image, box image.Rectangle) *image.RGBA {
	out := image.NewRGBA(image.Rect(0, 0, box.Dx(), box.Dy()))
	draw.Draw(out, out.Bounds(), img, box.Min, draw.Src)
	return out
}

// DecodeDataMatrix finds and reads one Data Matrix in an image, which should
// hold the symbol with its quiet zone and little else. The answer is what a
// scanner sends that is set to tell the kind of symbol: "]d2" before the
// element strings of a GS1 DataMatrix, whose leading FNC1 is thereby said and
// not repeated; "]d1" before the text of a plain one. A separator is \x1d,
// whether it was encoded as FNC1 or as GS.
//
// At three pixels a module the reader behind it often miscounts the columns;
// where the picture as it is does not decode, every pixel is shown twice each
// way and read again: a camera sees more than that, and nothing is added.
func DecodeDataMatrix(img image.Image) (string, error) {
	text, err := decode(img)
	if err == nil {
		return text, nil
	}
	if text, again := decode(doubled(img)); again == nil {
		return text, nil
	}
	return "", err
}

func doubled(img image.Image) image.Image {
	b := img.Bounds()
	out := image.NewRGBA(image.Rect(0, 0, 2*b.Dx(), 2*b.Dy()))
	for y := range out.Bounds().Dy() {
		for x := range out.Bounds().Dx() {
			out.Set(x, y, img.At(b.Min.X+x/2, b.Min.Y+y/2))
		}
	}
	return out
}

func decode(img image.Image) (string, error) {
	bitmap, err := gozxing.NewBinaryBitmapFromImage(img)
	if err != nil {
		return "", err
	}
	hints := map[gozxing.DecodeHintType]any{gozxing.DecodeHintType_TRY_HARDER: true}
	result, err := datamatrix.NewDataMatrixReader().Decode(bitmap, hints)
	if err != nil {
		return "", err
	}
	kind, _ := result.GetResultMetadata()[gozxing.ResultMetadataType_SYMBOLOGY_IDENTIFIER].(string)
	text := result.GetText()
	if kind == "]d2" {
		text = strings.TrimPrefix(text, "\x1d")
	}
	return kind + text, nil
}
