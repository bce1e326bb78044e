package main

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"sort"
	"strings"

	"drawup/dilution/refusal"
	"drawup/layouts/ink"
	"drawup/layouts/pdf"
)

// A file is one finished output: all of its bytes, in memory.
type file struct {
	path string
	data []byte
}

// pdfOf turns pages into the bytes of a PDF.
func pdfOf(pages []ink.Page, title string, j *job) ([]byte, refusal.List) {
	var b bytes.Buffer
	err := pdf.Write(&b, pdf.Document{
		Pages: pages, Title: title, Subject: j.subject(),
		Creator: "drawup", Language: "en-GB", Made: j.list.At,
	})
	if err == nil {
		return b.Bytes(), nil
	}
	code := refusal.OutputUnwritable
	remedy := "take the character or text out of the order"
	if glyph := (*pdf.MissingGlyph)(nil); asError(err, &glyph) {
		code = refusal.GlyphMissing
	}
	if off := (*pdf.OffPage)(nil); asError(err, &off) {
		code, remedy = refusal.TextTooLong, "shorten the long texts of the order, such as the place or the preparer"
	}
	return nil, refusal.List{{
		Code: code, Severity: refusal.Refuse,
		Field: title, Rule: "R15",
		Message: "the page cannot be drawn: " + err.Error(),
		Remedy:  remedy,
	}}
}

// writeAll writes every file or none: each goes to a temporary name beside its
// place first; only when all are whole are they renamed. The last file of the
// list is removed first and renamed last, so that it marks a complete set.
//
// inputs are the files that were read; none of them is ever written over, and
// neither is a folder, nor a file of another kind.
func writeAll(files []file, inputs []string) refusal.List {
	if l := overwrites(files, inputs); l.Refused() {
		return l
	}
	var temps, made []string
	undo := func() {
		for _, t := range temps {
			os.Remove(t)
		}
		for i := len(made) - 1; i >= 0; i-- {
			os.Remove(made[i]) // only folders that are new, and only while empty
		}
	}
	for _, dir := range folders(files) {
		fresh, err := makeFolder(dir)
		made = append(made, fresh...)
		if err != nil {
			undo()
			return unwritable(dir, err)
		}
	}
	for _, f := range files {
		temp, err := writeTemp(f)
		if temp != "" {
			temps = append(temps, temp)
		}
		if err != nil {
			undo()
			return unwritable(f.path, err)
		}
	}
	mark := files[len(files)-1].path
	if err := os.Remove(mark); err != nil && !os.IsNotExist(err) {
		undo()
		return unwritable(mark, err)
	}
	if err := clearOld(files); err != nil {
		undo()
		return incomplete(filepath.Dir(mark), err)
	}
	for i, f := range files {
		if err := os.Rename(temps[i], f.path); err != nil {
			undo()
			return incomplete(f.path, err)
		}
	}
	return nil
}

// paperNames are the files that a set of papers may hold, for filepath.Glob.
var paperNames = []string{"draw-up.pdf", "labels.pdf", "labels-*.pdf", "pump-cards.pdf", "check-sheets.pdf"}

// clearOld takes away papers of an earlier set that the new one does not have,
// so that no pump card of another list lies beside it. It does so only where a
// set is written, not for a single label.
func clearOld(files []file) error {
	last := files[len(files)-1].path
	if filepath.Base(last) != planName {
		return nil
	}
	keep := map[string]bool{}
	for _, f := range files {
		keep[filepath.Clean(f.path)] = true
	}
	for _, dir := range folders(files) {
		for _, name := range paperNames {
			old, err := filepath.Glob(filepath.Join(escapeGlob(dir), name))
			if err != nil {
				return err
			}
			for _, path := range old {
				if keep[filepath.Clean(path)] {
					continue
				}
				if err := os.Remove(path); err != nil {
					return err
				}
			}
		}
	}
	return nil
}

// escapeGlob makes a folder's own name plain for filepath.Glob.
func escapeGlob(dir string) string {
	return strings.NewReplacer(`*`, `\*`, `?`, `\?`, `[`, `\[`).Replace(dir)
}

// makeFolder makes dir with its parents and names those that were not there,
// outermost first.
func makeFolder(dir string) ([]string, error) {
	var fresh []string
	for d := filepath.Clean(dir); ; d = filepath.Dir(d) {
		if _, err := os.Stat(d); err == nil || d == filepath.Dir(d) {
			break
		}
		fresh = append([]string{d}, fresh...)
	}
	return fresh, os.MkdirAll(dir, 0o755)
}

// writeTemp writes f in full beside its place, to disk, and returns the name.
func writeTemp(f file) (string, error) {
	t, err := os.CreateTemp(filepath.Dir(f.path), "."+filepath.Base(f.path)+".*.tmp")
	if err != nil {
		return "", err
	}
	name := t.Name()
	_, err = t.Write(f.data)
	if err == nil {
		err = t.Sync()
	}
	if e := t.Close(); err == nil {
		err = e
	}
	if err == nil {
		err = os.Chmod(name, 0o644)
	}
	return name, err
}

func folders(files []file) []string {
	seen := map[string]bool{}
	var out []string
	for _, f := range files {
		if dir := filepath.Dir(f.path); !seen[dir] {
			seen[dir] = true
			out = append(out, dir)
		}
	}
	sort.Strings(out)
	return out
}

func unwritable(path string, err error) refusal.List {
	return refusal.List{{
		Code: refusal.OutputUnwritable, Severity: refusal.Refuse,
		Field: "--out", Got: path,
		Want:    "a folder with room that can be written",
		Message: fmt.Sprintf("%s cannot be written: %v; nothing was made", path, err),
		Remedy:  "check the folder, its rights and the free space",
	}}
}

// incomplete says that the set at a place is mixed: some files are new, others
// are not. It can come only from the file system between two renames.
func incomplete(path string, err error) refusal.List {
	l := unwritable(path, err)
	l[0].Message = fmt.Sprintf(
		"%s cannot be put in its place: %v; the set there is not complete and must not be used",
		path, err,
	)
	return l
}

// kindBytes is how much at the head of a file tells its kind, as "%PDF" does.
const kindBytes = 4

// otherKind reports a file at f's place that begins as none of f's kind does: a
// formulary that was named where a PDF goes, or a table that a spreadsheet saved.
func otherKind(f file) bool {
	there, err := os.Open(f.path)
	if err != nil {
		return false // what cannot be opened is found when it is written
	}
	defer there.Close() // only read
	head := make([]byte, min(kindBytes, len(f.data)))
	n, err := io.ReadFull(there, head)
	return n > 0 && (err != nil || !bytes.Equal(head, f.data[:n]))
}

// overwrites refuses to put a paper where a folder, a file that was read or one of
// another kind is.
func overwrites(files []file, inputs []string) refusal.List {
	var out refusal.List
	for _, f := range files {
		there, err := os.Stat(f.path)
		if err != nil {
			continue
		}
		if there.IsDir() {
			out = append(out, unwritable(f.path, errors.New("a folder of that name is there"))...)
		}
		for _, in := range inputs {
			if order, err := os.Stat(in); err == nil && os.SameFile(order, there) {
				out = append(out, unwritable(f.path, errors.New("it is one of the files that were read"))...)
			}
		}
		if there.Mode().IsRegular() && otherKind(f) {
			out = append(out, unwritable(f.path, errors.New("a file of another kind is there"))...)
			out[len(out)-1].Want, out[len(out)-1].Remedy = "a new name, or an older file of the same kind", "choose another name"
		}
	}
	return out
}
