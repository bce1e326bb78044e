package pdf

import (
	"bytes"
	"crypto/sha256"
	"encoding/xml"
	"fmt"
	"hash"
	"io"
	"strings"
	"time"

	"github.com/go-pdf/fpdf"
)

// finish writes the library's file and, after it, an incremental update
// (ISO 32000-1:2008, 7.5.6) with what the library cannot say: that the
// viewer must not scale the pages for the printer (PrintScaling None, 12.2),
// the language, and metadata that the catalogue points to.
func finish(w io.Writer, lib *fpdf.Fpdf, doc Document) error {
	marked := 0
	for _, page := range doc.Pages {
		if page.Bookmark != "" {
			marked++
		}
	}
	// The tail must reach back over the cross-reference table, twenty bytes
	// an object, to the catalogue just before it.
	tail := tailWriter{to: w, hash: sha256.New(), keep: 20*(2*len(doc.Pages)+marked+64) + 8192}
	if err := lib.Output(&tail); err != nil {
		return fmt.Errorf("pdf library: %w", err)
	}
	old, err := readTail(tail.kept)
	if err != nil {
		return err
	}
	_, err = w.Write(update(old, tail.count, tail.hash.Sum(nil), doc))
	return err
}

// tailWriter passes everything on and keeps the last bytes of it.
type tailWriter struct {
	to    io.Writer
	hash  hash.Hash
	keep  int
	kept  []byte
	count int64
}

func (t *tailWriter) Write(p []byte) (int, error) {
	n, err := t.to.Write(p)
	t.count += int64(n)
	t.hash.Write(p[:n])
	t.kept = append(t.kept, p[max(0, n-t.keep):n]...)
	t.kept = t.kept[max(0, len(t.kept)-t.keep):]
	return n, err
}

// trailer is what an update must repeat of the file before it.
type trailer struct {
	size, root, info int   // number of objects, object numbers
	outlines         int   // object number, 0 if there are no bookmarks
	start            int64 // of the cross-reference table
}

// readTail reads the end of the library's file.
func readTail(tail []byte) (trailer, error) {
	var t trailer
	at := bytes.LastIndex(tail, []byte("trailer\n"))
	catalogue := bytes.LastIndex(tail, []byte("/Type /Catalog\n"))
	if at < 0 || catalogue < 0 || catalogue > at {
		return t, fmt.Errorf("pdf library: got no catalogue and trailer at the end, want both")
	}
	form := "trailer\n<<\n/Size %d\n/Root %d 0 R\n/Info %d 0 R\n>>\nstartxref\n%d\n%%%%EOF"
	if _, err := fmt.Sscanf(string(tail[at:]), form, &t.size, &t.root, &t.info, &t.start); err != nil {
		return t, fmt.Errorf("pdf library: got trailer %q: %w", tail[at:], err)
	}
	if _, rest, found := bytes.Cut(tail[catalogue:at], []byte("/Outlines ")); found {
		if _, err := fmt.Sscanf(string(rest), "%d 0 R", &t.outlines); err != nil {
			return t, fmt.Errorf("pdf library: got no number of the outline: %w", err)
		}
	}
	return t, nil
}

// update is the text that follows a file of the given length and digest.
func update(old trailer, length int64, digest []byte, doc Document) []byte {
	var out bytes.Buffer
	packet := metadata(doc)
	catalogueAt := length
	fmt.Fprintf(&out, "%d 0 obj\n<</Type /Catalog /Version /1.7 /Pages 1 0 R\n", old.root)
	if old.outlines > 0 {
		fmt.Fprintf(&out, "/Outlines %d 0 R /PageMode /UseOutlines\n", old.outlines)
	}
	if doc.Language != "" {
		fmt.Fprintf(&out, "/Lang (%s)\n", doc.Language)
	}
	fmt.Fprintf(&out, "/ViewerPreferences <</PrintScaling /None /DisplayDocTitle true>>\n/Metadata %d 0 R>>\nendobj\n", old.size)
	metadataAt := length + int64(out.Len())
	fmt.Fprintf(&out, "%d 0 obj\n<</Type /Metadata /Subtype /XML /Length %d>>\nstream\n%s\nendstream\nendobj\n", old.size, len(packet), packet)
	start := length + int64(out.Len())
	fmt.Fprintf(&out, "xref\n0 1\n0000000000 65535 f \n%d 1\n%010d 00000 n \n%d 1\n%010d 00000 n \n", old.root, catalogueAt, old.size, metadataAt)
	fmt.Fprintf(&out, "trailer\n<</Size %d /Root %d 0 R /Info %d 0 R /Prev %d /ID [<%x> <%x>]>>\n",
		old.size+1, old.root, old.info, old.start, digest[:16], digest[16:])
	fmt.Fprintf(&out, "startxref\n%d\n%%%%EOF\n", start)
	return out.Bytes()
}

// metadata is the XMP packet (ISO 16684-1) that repeats the document
// information.
func metadata(doc Document) string {
	var out strings.Builder
	out.WriteString("<?xpacket begin=\"\ufeff\" id=\"W5M0MpCehiHzreSzNTczkc9d\"?>\n" +
		"<x:xmpmeta xmlns:x=\"adobe:ns:meta/\"><rdf:RDF xmlns:rdf=\"http://www.w3.org/1999/02/22-rdf-syntax-ns#\">\n" +
		"<rdf:Description rdf:about=\"\" xmlns:dc=\"http://purl.org/dc/elements/1.1/\"" +
		" xmlns:xmp=\"http://ns.adobe.com/xap/1.0/\" xmlns:pdf=\"http://ns.adobe.com/pdf/1.3/\">\n")
	element(&out, "dc:format", "application/pdf")
	inList(&out, "dc:title", "Alt", doc.Title)
	inList(&out, "dc:description", "Alt", doc.Subject)
	inList(&out, "dc:language", "Bag", doc.Language)
	element(&out, "pdf:Keywords", doc.Keywords)
	element(&out, "pdf:Producer", doc.Creator)
	element(&out, "xmp:CreatorTool", doc.Creator)
	element(&out, "xmp:CreateDate", doc.Made.Format(time.RFC3339))
	element(&out, "xmp:ModifyDate", doc.Made.Format(time.RFC3339))
	out.WriteString("</rdf:Description></rdf:RDF></x:xmpmeta>\n<?xpacket end=\"r\"?>")
	return out.String()
}

// element writes one property; nothing for an empty one.
func element(out *strings.Builder, name, text string) {
	if text != "" {
		fmt.Fprintf(out, "<%s>%s</%s>\n", name, escape(text), name)
	}
}

// inList writes a property whose values stand in a list: Alt for words in a
// language, Bag for the rest.
func inList(out *strings.Builder, name, kind, text string) {
	if text == "" {
		return
	}
	language := ""
	if kind == "Alt" {
		language = " xml:lang=\"x-default\""
	}
	fmt.Fprintf(out, "<%s><rdf:%s><rdf:li%s>%s</rdf:li></rdf:%s></%s>\n", name, kind, language, escape(text), kind, name)
}

func escape(text string) string {
	var out strings.Builder
	// Writing to a strings.Builder cannot fail.
	_ = xml.EscapeText(&out, []byte(text))
	return out.String()
}
