package ink_test

import (
	"strings"
	"testing"

	"drawup/layouts/ink"
)

func TestDump(t *testing.T) {
	page := ink.Page{W: ink.MM(35), H: ink.MM(12), Bookmark: "Syringe 1"}
	page.Add(
		ink.Filled(0, 0, ink.MM(35), ink.Tenths(25), ink.Colour{R: 255, G: 200, B: 1}),
		ink.Outlined(100, 200, 300, 400, 50, ink.Black),
		ink.Rect{X: 1, Y: 2, W: 3, H: 4, Fill: ink.Use(ink.White), Stroke: ink.Use(ink.Black), Width: 10},
		ink.Text{X: 1000, Y: 3500, Size: 3582, Face: ink.Bold, Colour: ink.Black, String: "Ephedrine \"3\""},
		ink.Text{X: 1000, Y: 3500, Size: 1000, Face: ink.Regular, Colour: ink.White, String: "up", Rotate: 90},
		ink.Rule(0, 10, 20, 30),
		ink.Line{X1: 1, Y1: 2, X2: 3, Y2: 4, Width: 5, Colour: ink.White, Dash: true},
		ink.Polygon{Points: []ink.Point{{0, 0}, {10, 0}, {0, 10}}, Fill: ink.Black},
		ink.Symbol{X: 7, Y: 8, Module: 255, Rows: []string{"#.", "##"}, Colour: ink.Black},
	)
	want := `page 1 35000x12000 bookmark "Syringe 1"
rect 0,0 35000x2500 fill #ffc801
rect 100,200 300x400 stroke #000000 width 50
rect 1,2 3x4 fill #ffffff stroke #000000 width 10
text 1000,3500 size 3582 bold #000000 "Ephedrine \"3\""
text 1000,3500 size 1000 regular #ffffff rotate 90 "up"
line 0,10 20,10 width 30 #000000
line 1,2 3,4 width 5 #ffffff dash
polygon fill #000000 0,0 10,0 0,10
symbol 7,8 module 255 #000000 rows #.|##
page 2 1000x2000
`
	var got strings.Builder
	if err := ink.Dump(&got, []ink.Page{page, {W: 1000, H: 2000}}); err != nil {
		t.Fatal(err)
	}
	if got.String() != want {
		t.Errorf("got\n%swant\n%s", got.String(), want)
	}
}

func TestDumpUnknownMark(t *testing.T) {
	err := ink.Dump(&strings.Builder{}, []ink.Page{{Marks: []ink.Mark{nil}}})
	if err == nil || !strings.Contains(err.Error(), "page 1") {
		t.Errorf("got error %v, want one that names page 1", err)
	}
}
