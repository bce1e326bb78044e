package main

import (
	"bytes"
	"fmt"
	"os"
	"path/filepath"
	"sort"

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
	err := pdf.Write(&b, pdf.Document{Pages: pages, Title: title, Subject: j.making.State, Creator: "drawup", Language: "en-GB", Made: j.list.At})
	if err == nil {
		return b.Bytes(), nil
	}
	code := refusal.OutputUnwritable
	if glyph := (*pdf.MissingGlyph)(nil); asError(err, &glyph) {
		code = refusal.GlyphMissing
	}
	return nil, refusal.List{{Code: code, Severity: refusal.Refuse, Field: title, Rule: "R15", Message: "the page cannot be drawn: " + err.Error(),
		Remedy: "take the character or text out of the order"}}
}

// writeAll writes every file or none: each goes to a temporary name beside its
// place first; only when all are whole are they renamed. The last file of the
// list is removed first and renamed last, so that it marks a complete set.
func writeAll(files []file) refusal.List {
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
	for i, f := range files {
		if err := os.Rename(temps[i], f.path); err != nil {
			undo()
			return incomplete(f.path, err)
		}
	}
	return nil
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
	return refusal.List{{Code: refusal.OutputUnwritable, Severity: refusal.Refuse, Field: "--out", Got: path, Want: "a folder with room that can be written",
		Message: fmt.Sprintf("%s cannot be written: %v; nothing was made", path, err), Remedy: "check the folder, its rights and the free space"}}
}

// incomplete says that the set at a place is mixed: some files are new, others
// are not. It can come only from the file system between two renames.
func incomplete(path string, err error) refusal.List {
	l := unwritable(path, err)
	l[0].Message = fmt.Sprintf("%s cannot be put in its place: %v; the set there is not complete and must not be used", path, err)
	return l
}
