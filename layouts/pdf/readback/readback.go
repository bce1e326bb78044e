// Package readback reads PDF files back with an independent renderer and an
// independent barcode reader. It is for tests only: nothing but files whose
// names end in _test.go may import it, so that no program carries it.
//
// The renderer is PDFium compiled to WebAssembly. One instance serves a whole
// test binary. Its machine code is kept in the user's cache folder, because
// compiling it anew takes seconds; without such a folder the folder for
// temporary files serves.
//
// All lengths are micrometres from the top left corner of the page, as in
// package ink, and pages are counted from 1.
package readback

import (
	"context"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"sync"
	"testing"
	"time"

	"drawup/layouts/ink"

	"github.com/klippa-app/go-pdfium"
	"github.com/klippa-app/go-pdfium/enums"
	"github.com/klippa-app/go-pdfium/references"
	"github.com/klippa-app/go-pdfium/requests"
	"github.com/klippa-app/go-pdfium/webassembly"
	"github.com/tetratelabs/wazero"
	"github.com/tetratelabs/wazero/api"
	"github.com/tetratelabs/wazero/experimental"
)

// shared is the one renderer of the test binary.
var shared = sync.OnceValues(start)

func start() (pdfium.Pdfium, error) {
	// The renderer's code needs the exception handling feature.
	config := wazero.NewRuntimeConfig().WithCoreFeatures(api.CoreFeaturesV2 | experimental.CoreFeaturesExceptionHandling)
	home, err := os.UserCacheDir()
	if err != nil {
		home = os.TempDir()
	}
	cache, err := wazero.NewCompilationCacheWithDir(filepath.Join(home, "drawup-readback"))
	if err == nil {
		config = config.WithCompilationCache(cache)
	}
	pool, err := webassembly.Init(webassembly.Config{
		Context:       context.Background(),
		MinIdle:       1,
		MaxIdle:       1,
		MaxTotal:      1,
		RuntimeConfig: config,
	})
	if err != nil {
		return nil, fmt.Errorf("renderer: %w", err)
	}
	instance, err := pool.GetInstance(time.Minute)
	if err != nil {
		return nil, fmt.Errorf("renderer: %w", err)
	}
	return instance, nil
}

// File is an opened PDF file.
type File struct {
	t        testing.TB
	renderer pdfium.Pdfium
	document references.FPDF_DOCUMENT
}

// Open opens the bytes of a PDF file and closes it when the test ends. The
// test fails at once if the renderer cannot read it; so do the methods of
// File if they cannot do their work.
func Open(t testing.TB, pdf []byte) *File {
	t.Helper()
	renderer, err := shared()
	if err != nil {
		t.Fatal(err)
	}
	opened, err := renderer.OpenDocument(&requests.OpenDocument{File: &pdf})
	if err != nil {
		t.Fatalf("opening %d bytes of PDF: %v", len(pdf), err)
	}
	t.Cleanup(func() {
		if _, err := renderer.FPDF_CloseDocument(&requests.FPDF_CloseDocument{Document: opened.Document}); err != nil {
			t.Errorf("closing the PDF: %v", err)
		}
	})
	return &File{t: t, renderer: renderer, document: opened.Document}
}

// Pages returns the number of pages.
func (f *File) Pages() int {
	f.t.Helper()
	count, err := f.renderer.FPDF_GetPageCount(&requests.FPDF_GetPageCount{Document: f.document})
	f.must("counting pages", err)
	return count.PageCount
}

// Size returns width and height of a page.
func (f *File) Size(page int) (w, h ink.Micrometre) {
	f.t.Helper()
	size, err := f.renderer.FPDF_GetPageSizeByIndex(&requests.FPDF_GetPageSizeByIndex{Document: f.document, Index: page - 1})
	f.must("page size", err)
	return micrometres(size.Width), micrometres(size.Height)
}

// NoScaling reports whether the file asks the viewer not to scale its pages
// for the printer.
func (f *File) NoScaling() bool {
	f.t.Helper()
	got, err := f.renderer.FPDF_VIEWERREF_GetPrintScaling(&requests.FPDF_VIEWERREF_GetPrintScaling{Document: f.document})
	f.must("print scaling", err)
	return !got.PreferPrintScaling
}

// Bookmark is one entry of the document outline.
type Bookmark struct {
	Title string
	Page  int // from 1
}

// Bookmarks returns the top level of the document outline.
func (f *File) Bookmarks() []Bookmark {
	f.t.Helper()
	got, err := f.renderer.GetBookmarks(&requests.GetBookmarks{Document: f.document})
	f.must("bookmarks", err)
	var marks []Bookmark
	for _, mark := range got.Bookmarks {
		if mark.DestInfo == nil {
			f.t.Fatalf("bookmark %q: got no destination, want a page", mark.Title)
		}
		marks = append(marks, Bookmark{mark.Title, mark.DestInfo.PageIndex + 1})
	}
	return marks
}

// About returns an entry of the document information, such as "Title";
// empty if there is none.
func (f *File) About(entry string) string {
	f.t.Helper()
	got, err := f.renderer.FPDF_GetMetaText(&requests.FPDF_GetMetaText{Document: f.document, Tag: entry})
	f.must("document information", err)
	return got.Value
}

// Run is one piece of text as it was put on the page: one ink.Text, in the
// order of drawing. Text that is blank or empty gives none.
type Run struct {
	Text string
	// X, Y, W, H is the box of the text: along the line the advance widths
	// or the ink, whichever the renderer counts, across it the ink. The
	// renderer widens it by up to some 60 micrometres; StartX and StartY are
	// exact to about 2.
	X, Y, W, H ink.Micrometre
	// StartX, StartY is the left end of the baseline.
	StartX, StartY ink.Micrometre
	// Size is the em size.
	Size ink.Micrometre
	// Font is the font's name in the file, which is "utf8" and the letters
	// of the face's name: "utf8regular", "utf8condensedsemibold".
	Font   string
	Colour ink.Colour
	// Upwards is true for text turned a quarter anticlockwise.
	Upwards bool
}

// Text returns the runs of a page.
func (f *File) Text(page int) []Run {
	f.t.Helper()
	at := f.page(page)
	_, height := f.Size(page)
	loaded, err := f.renderer.FPDFText_LoadPage(&requests.FPDFText_LoadPage{Page: at})
	f.must("loading text", err)
	defer func() {
		_, err := f.renderer.FPDFText_ClosePage(&requests.FPDFText_ClosePage{TextPage: loaded.TextPage})
		f.must("closing text", err)
	}()
	count, err := f.renderer.FPDFPage_CountObjects(&requests.FPDFPage_CountObjects{Page: at})
	f.must("counting marks", err)
	var runs []Run
	for i := range count.Count {
		object, err := f.renderer.FPDFPage_GetObject(&requests.FPDFPage_GetObject{Page: at, Index: i})
		f.must("finding a mark", err)
		kind, err := f.renderer.FPDFPageObj_GetType(&requests.FPDFPageObj_GetType{PageObject: object.PageObject})
		f.must("kind of mark", err)
		if kind.Type == enums.FPDF_PAGEOBJ_TEXT {
			if run := f.run(object.PageObject, loaded.TextPage, height); run.Text != "" {
				runs = append(runs, run)
			}
		}
	}
	return runs
}

// run reads one text object.
func (f *File) run(object references.FPDF_PAGEOBJECT, page references.FPDF_TEXTPAGE, height ink.Micrometre) Run {
	f.t.Helper()
	text, err := f.renderer.FPDFTextObj_GetText(&requests.FPDFTextObj_GetText{PageObject: object, TextPage: page})
	if err != nil {
		return Run{} // the renderer's answer for a blank
	}
	bounds, err := f.renderer.FPDFPageObj_GetBounds(&requests.FPDFPageObj_GetBounds{PageObject: object})
	f.must("text box", err)
	matrix, err := f.renderer.FPDFPageObj_GetMatrix(&requests.FPDFPageObj_GetMatrix{PageObject: object})
	f.must("text place", err)
	size, err := f.renderer.FPDFTextObj_GetFontSize(&requests.FPDFTextObj_GetFontSize{PageObject: object})
	f.must("text size", err)
	font, err := f.renderer.FPDFTextObj_GetFont(&requests.FPDFTextObj_GetFont{PageObject: object})
	f.must("font", err)
	name, err := f.renderer.FPDFFont_GetBaseFontName(&requests.FPDFFont_GetBaseFontName{Font: font.Font})
	f.must("font name", err)
	fill, err := f.renderer.FPDFPageObj_GetFillColor(&requests.FPDFPageObj_GetFillColor{PageObject: object})
	f.must("colour", err)
	left, top := micrometres(float64(bounds.Left)), height-micrometres(float64(bounds.Top))
	return Run{
		Text: text.Text,
		X:    left, Y: top,
		W: micrometres(float64(bounds.Right)) - left, H: height - micrometres(float64(bounds.Bottom)) - top,
		StartX: micrometres(float64(matrix.Matrix.E)), StartY: height - micrometres(float64(matrix.Matrix.F)),
		Size:    micrometres(float64(size.FontSize)),
		Font:    name.BaseFontName,
		Colour:  ink.Colour{R: uint8(fill.FillColor.R), G: uint8(fill.FillColor.G), B: uint8(fill.FillColor.B)},
		Upwards: matrix.Matrix.B > 0.5,
	}
}

// AllText returns the text of a page as the renderer reads it for copying,
// line by line.
func (f *File) AllText(page int) string {
	f.t.Helper()
	text, err := f.renderer.GetPageText(&requests.GetPageText{Page: f.page(page)})
	f.must("reading text", err)
	return text.Text
}

func (f *File) page(page int) requests.Page {
	return requests.Page{ByIndex: &requests.PageByIndex{Document: f.document, Index: page - 1}}
}

// must ends the test on an error of the renderer.
func (f *File) must(what string, err error) {
	f.t.Helper()
	if err != nil {
		f.t.Fatalf("%s: %v", what, err)
	}
}

// micrometres turns points into micrometres, to the nearest.
func micrometres(points float64) ink.Micrometre {
	return ink.Micrometre(math.Round(points * 25400 / 72))
}
