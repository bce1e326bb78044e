//go:build secondopinion

package main

import (
	"fmt"
	"image"
	"image/png"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"

	"drawup/layouts/ink"
	"drawup/layouts/pdf/readback"
)

// dmtxread reads the codes of the demonstration with all that stands around
// them, at the dots per inch of label and office printers, out of focus, and two
// and three degrees askew. What it reads of GS1 symbols is right every time; what
// it does not read is counted and told.
func TestSecondOpinionBarcodesSeen(t *testing.T) {
	dir := prepared(t)
	j := demoJob(t)
	f := readback.Open(t, load(t, filepath.Join(dir, "labels.pdf")))
	flags, _ := readPaperFlags("prepare", nil)
	parts, _ := flags.labelParts(j)
	pages, reasons := parts[0].pages(j, false)
	if reasons.Refused() {
		t.Fatal(reasons.Refusals())
	}
	says := map[string]bool{}
	for _, l := range j.labels {
		for _, code := range l.Codes {
			says[symbolText(code.Text)] = true
		}
	}
	missed, all := map[string]int{}, map[string]int{}
	for _, dpi := range []int{203, 300, 600} {
		for n, page := range pages {
			img := f.Render(n+1, dpi)
			for _, s := range symbolsOf(page) {
				for name, picture := range sights(img, s, dpi) {
					name = strings.Join([]string{name, "at", map[int]string{203: "203", 300: "300", 600: "600"}[dpi]}, " ")
					all[name]++
					switch text := dmtx(t, dir, picture, len(s.Rows)); {
					case text == "":
						missed[name]++
					case !says[text]:
						t.Errorf("%s: dmtxread reads %q, which no label says", name, text)
					}
				}
			}
		}
	}
	for name, n := range all {
		t.Logf("%s: %d of %d read", name, n-missed[name], n)
		if missed[name]*5 > n {
			t.Errorf("%s: dmtxread misses %d of %d", name, missed[name], n)
		}
	}
}

// sights are pictures of one symbol and 1 mm around it.
func sights(img *image.RGBA, s ink.Symbol, dpi int) map[string]*image.RGBA {
	side, around := ink.Micrometre(len(s.Rows))*s.Module, ink.MM(1)
	crop := readback.Crop(img, s.X-around, s.Y-around, side+2*around, side+2*around, dpi)
	if dpi < 600 {
		crop = readback.Doubled(crop)
	}
	crop = readback.Framed(crop, 20)
	soft := readback.Blurred(crop, 1)
	return map[string]*image.RGBA{
		"as it is": crop, "out of focus": readback.Blurred(crop, map[int]int{203: 1, 300: 2, 600: 3}[dpi]),
		"2 degrees": readback.Turned(soft, 2), "-3 degrees": readback.Turned(soft, -3),
	}
}

// dmtx is what dmtxread reads in a picture, "" for nothing. It is told the size of
// the symbol: else it takes a corner of it for one of 10 modules now and then.
func dmtx(t *testing.T, dir string, img *image.RGBA, modules int) string {
	t.Helper()
	if _, err := exec.LookPath("dmtxread"); err != nil {
		t.Fatal("dmtxread is absent; .ci/run installs it")
	}
	path := filepath.Join(dir, "sight.png")
	file, err := os.Create(path)
	if err != nil {
		t.Fatal(err)
	}
	if err = png.Encode(file, img); err == nil {
		err = file.Close()
	}
	if err != nil {
		t.Fatal(err)
	}
	out, err := exec.Command("dmtxread", "-N1", "-G29", "-m1500", fmt.Sprintf("-s%dx%d", modules, modules), path).Output()
	if err != nil && len(out) == 0 {
		return "" // its exit code says that it found nothing
	}
	text, ok := strings.CutPrefix(strings.TrimRight(string(out), "\n"), "\x1d")
	if !ok {
		return "" // no FNC1 in front: no GS1 symbol
	}
	return text
}
