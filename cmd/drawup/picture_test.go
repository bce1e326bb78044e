package main

import (
	"bytes"
	"flag"
	"image"
	"image/color"
	"image/draw"
	"image/png"
	"os"
	"path/filepath"
	"testing"

	"drawup/layouts/ink"
	"drawup/layouts/pdf/readback"
)

var update = flag.Bool("update", false, "write the README's picture anew; look at it afterwards")

const picture = "../../testdata/picture/papers.png"

// TestPicture holds the README's picture to the real output: labels, a pump
// card and a blind page of the demonstration list, as another renderer draws
// them. It is for looks; run it with -update and look after a change.
func TestPicture(t *testing.T) {
	out := prepared(t)
	open := func(name string) *readback.File { return readback.Open(t, load(t, filepath.Join(out, name))) }
	const dpi, gap = 110, 24
	labels := readback.Crop(open("labels.pdf").Render(1, dpi), 0, ink.MM(9), ink.MM(210), ink.MM(90), dpi)
	card, blind := open("pump-cards.pdf").Render(1, dpi), open("check-sheets.pdf").Render(1, dpi)
	w := labels.Bounds().Dx() + 2*gap
	h := labels.Bounds().Dy() + card.Bounds().Dy() + 3*gap
	page := image.NewRGBA(image.Rect(0, 0, w+blind.Bounds().Dx()+gap, max(h, blind.Bounds().Dy()+2*gap)))
	draw.Draw(page, page.Bounds(), image.NewUniform(color.RGBA{220, 220, 220, 255}), image.Point{}, draw.Src)
	place := func(img image.Image, x, y int) {
		draw.Draw(page, img.Bounds().Sub(img.Bounds().Min).Add(image.Pt(x, y)), img, img.Bounds().Min, draw.Src)
	}
	place(labels, gap, gap)
	place(card, gap, labels.Bounds().Dy()+2*gap)
	place(blind, w, gap)
	if *update {
		var b bytes.Buffer
		if err := (&png.Encoder{CompressionLevel: png.BestCompression}).Encode(&b, page); err != nil {
			t.Fatal(err)
		}
		if err := os.MkdirAll(filepath.Dir(picture), 0o755); err != nil {
			t.Fatal(err)
		}
		if err := os.WriteFile(picture, b.Bytes(), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	stored, err := png.Decode(bytes.NewReader(load(t, picture)))
	if err != nil {
		t.Fatal(err)
	}
	if n := unlike(page, stored); n > 0 {
		t.Errorf("the README's picture differs from the output in %d pixels; run go test ./cmd/drawup -run TestPicture -update and look at it", n)
	}
}

// unlike counts the pixels that differ visibly; all of them for another size.
func unlike(a, b image.Image) int {
	if a.Bounds() != b.Bounds() {
		return a.Bounds().Dx() * a.Bounds().Dy()
	}
	n := 0
	for y := a.Bounds().Min.Y; y < a.Bounds().Max.Y; y++ {
		for x := a.Bounds().Min.X; x < a.Bounds().Max.X; x++ {
			r, g, bl, _ := a.At(x, y).RGBA()
			r2, g2, b2, _ := b.At(x, y).RGBA()
			if far(r, r2) || far(g, g2) || far(bl, b2) {
				n++
			}
		}
	}
	return n
}

func far(a, b uint32) bool { return a > b+0x1000 || b > a+0x1000 }
