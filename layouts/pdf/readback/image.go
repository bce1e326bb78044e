package readback

import (
	"image"
	"image/color"
	"image/draw"
	"math"
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

// Blurred is a picture out of focus: every pixel is the mean of those within a
// distance, twice over.
func Blurred(img *image.RGBA, distance int) *image.RGBA {
	for range 2 {
		img = mean(mean(img, distance, 0), 0, distance)
	}
	return img
}

// mean takes the mean of the pixels within dx along a row and dy along a column.
func mean(img *image.RGBA, dx, dy int) *image.RGBA {
	b := img.Bounds()
	out := image.NewRGBA(b)
	for y := b.Min.Y; y < b.Max.Y; y++ {
		for x := b.Min.X; x < b.Max.X; x++ {
			var r, g, bl, n int
			for j := max(y-dy, b.Min.Y); j <= min(y+dy, b.Max.Y-1); j++ {
				for i := max(x-dx, b.Min.X); i <= min(x+dx, b.Max.X-1); i++ {
					c := img.RGBAAt(i, j)
					r, g, bl, n = r+int(c.R), g+int(c.G), bl+int(c.B), n+1
				}
			}
			out.SetRGBA(x, y, color.RGBA{uint8(r / n), uint8(g / n), uint8(bl / n), 255})
		}
	}
	return out
}

// Framed is a picture with so many pixels of white around it.
func Framed(img *image.RGBA, white int) *image.RGBA {
	b := img.Bounds()
	out := image.NewRGBA(image.Rect(0, 0, b.Dx()+2*white, b.Dy()+2*white))
	draw.Draw(out, out.Bounds(), image.White, image.Point{}, draw.Src)
	draw.Draw(out, b.Sub(b.Min).Add(image.Pt(white, white)), img, b.Min, draw.Src)
	return out
}

// Turned is a picture turned about its middle, on white; each pixel is the mean
// of the four that it falls between.
func Turned(img *image.RGBA, degrees float64) *image.RGBA {
	b := img.Bounds()
	out := image.NewRGBA(image.Rect(0, 0, b.Dx(), b.Dy()))
	sin, cos := math.Sincos(degrees * math.Pi / 180)
	midX, midY := float64(b.Dx()-1)/2, float64(b.Dy()-1)/2
	for y := range b.Dy() {
		for x := range b.Dx() {
			dx, dy := float64(x)-midX, float64(y)-midY
			out.SetRGBA(x, y, between(img, midX+dx*cos+dy*sin, midY-dx*sin+dy*cos))
		}
	}
	return out
}

// between is the colour at a place between pixels; white outside.
func between(img *image.RGBA, x, y float64) color.RGBA {
	left, top := math.Floor(x), math.Floor(y)
	var sum [3]float64
	for _, n := range [4][2]float64{{0, 0}, {1, 0}, {0, 1}, {1, 1}} {
		share := (1 - math.Abs(x-left-n[0])) * (1 - math.Abs(y-top-n[1]))
		c := color.RGBA{255, 255, 255, 255}
		if p := image.Pt(int(left+n[0]), int(top+n[1])); p.In(img.Bounds()) {
			c = img.RGBAAt(p.X, p.Y)
		}
		sum[0], sum[1], sum[2] = sum[0]+share*float64(c.R), sum[1]+share*float64(c.G), sum[2]+share*float64(c.B)
	}
	return color.RGBA{uint8(sum[0] + 0.5), uint8(sum[1] + 0.5), uint8(sum[2] + 0.5), 255}
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
	if text, again := decode(Doubled(img)); again == nil {
		return text, nil
	}
	return "", err
}

// Doubled shows every pixel twice each way.
func Doubled(img image.Image) *image.RGBA {
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
