// Package pdf turns pages of ink into the bytes of a PDF file.
//
// The same Document gives the same bytes on any machine: the only date is
// Document.Made, nothing depends on the order of a map, and every coordinate
// is worked out in whole numbers. Colours are written as DeviceRGB. A symbol
// is one path with one fill.
//
// Everything is checked before the first byte is written: a rune without a
// glyph, a mark that leaves its page or a mark that makes no sense is an
// error, and then nothing is written.
package pdf

import (
	"fmt"
	"io"
	"strings"
	"time"

	"drawup/layouts/ink"

	"github.com/go-pdf/fpdf"
)

// Document is what one PDF file holds.
type Document struct {
	// Pages are the pages in order; at least one.
	Pages []ink.Page
	// Title, Subject, Keywords and Creator go into the document information
	// and, but for empty ones, into the linked XMP metadata.
	Title, Subject, Keywords, Creator string
	// Language is a tag such as "en-GB" (letters, digits and hyphens); empty
	// for none.
	Language string
	// Made is the creation date, to the second and with its own zone. It
	// must not be zero: the file would take the clock's time instead.
	Made time.Time
}

// Write checks doc and writes it to w as PDF 1.7. Its errors are BadDocument,
// BadMark, MissingGlyph and OffPage, all found before w is touched, errors of
// the PDF library, and those of w.
func Write(w io.Writer, doc Document) error {
	faces, err := check(doc)
	if err != nil {
		return err
	}
	lib, names, err := open(doc, faces)
	if err != nil {
		return err
	}
	p := pen{lib: lib, names: names}
	bottom := points(doc.Pages[len(doc.Pages)-1].H)
	for _, page := range doc.Pages {
		lib.AddPageFormat("P", size(page))
		if page.Bookmark != "" {
			// The library measures a bookmark's height from the foot of the
			// last page, whatever page it is on.
			lib.Bookmark(page.Bookmark, 0, bottom-points(page.H))
		}
		p.draw(page)
	}
	if err := lib.Error(); err != nil {
		return fmt.Errorf("pdf library: %w", err)
	}
	return finish(w, lib, doc)
}

// open starts a document in points with the letters of the faces it needs, and
// returns the names of the faces in the file.
func open(doc Document, faces []letters) (*fpdf.Fpdf, map[ink.Face]string, error) {
	lib := fpdf.NewCustom(&fpdf.InitType{OrientationStr: "P", UnitStr: "pt", Size: size(doc.Pages[0])})
	lib.SetCatalogSort(true)
	lib.SetCreationDate(doc.Made)
	lib.SetModificationDate(doc.Made)
	lib.SetAutoPageBreak(false, 0)
	lib.SetTitle(doc.Title, true)
	lib.SetSubject(doc.Subject, true)
	lib.SetKeywords(doc.Keywords, true)
	lib.SetCreator(doc.Creator, true)
	lib.SetProducer(doc.Creator, true)
	names := map[ink.Face]string{}
	for _, f := range faces {
		lib.AddUTF8FontFromBytes(family(f.face), "", faceOf(f.face).File())
		// A face that the library could not read shows only here.
		lib.SetFont(family(f.face), "", 1)
		if err := lib.Error(); err != nil {
			return nil, nil, fmt.Errorf("pdf library: %w", err)
		}
		name, err := note(lib, f)
		if err != nil {
			return nil, nil, err
		}
		names[f.face] = name
	}
	if err := lib.Error(); err != nil {
		return nil, nil, fmt.Errorf("pdf library: %w", err)
	}
	return lib, names, nil
}

// note has the library take the letters of a face into the file, and returns
// the name under which its operators choose the face. Both are done in
// templates that are used nowhere: the library notes letters as it sets them,
// and shows the name in the operators it writes. The pen then writes text
// itself, as one run of operators for a page.
func note(lib *fpdf.Fpdf, f letters) (string, error) {
	var err error
	chosen := lib.CreateTemplate(func(t *fpdf.Tpl) {
		t.SetFont(family(f.face), "", 1)
		err = t.Error()
	})
	if err == nil {
		lib.CreateTemplate(func(t *fpdf.Tpl) {
			t.SetFont(family(f.face), "", 1)
			t.Text(0, 0, f.text())
			err = t.Error()
		})
	}
	if err != nil {
		return "", fmt.Errorf("pdf library: %w", err)
	}
	said := string(chosen.Bytes())
	_, rest, found := strings.Cut(said, "BT /")
	name, rest, ended := strings.Cut(rest, " ")
	if !found || !ended || !strings.HasPrefix(rest, "1.00 Tf ET") {
		return "", fmt.Errorf("pdf library: got %q for a choice of face, want its name and size", said)
	}
	return name, nil
}

// points gives a length in points, rounded to the hundredth that the library
// prints.
func points(v ink.Micrometre) float64 {
	return float64(hundredths(v)) / 100
}

func size(page ink.Page) fpdf.SizeType {
	return fpdf.SizeType{Wd: points(page.W), Ht: points(page.H)}
}
