package main

import (
	"bytes"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"unicode/utf8"
)

func read(t *testing.T, name string) []byte {
	t.Helper()
	text, err := os.ReadFile(filepath.Join("..", filepath.FromSlash(name)))
	if err != nil {
		t.Fatal(err)
	}
	return text
}

// The table in the tree is what go generate makes of the copy of the dictionary.
func TestTableIsGenerated(t *testing.T) {
	want, err := table(string(read(t, from)))
	if err != nil {
		t.Fatal(err)
	}
	if !bytes.Equal(read(t, to), want) {
		t.Error("table.go is not what go generate ./labels/gs1 makes of the dictionary")
	}
}

// The copy is whole: the public repository gives 30,235 characters for the file
// at the commit that dictionary/README.md names, and its licence asks for the
// notice to be kept.
func TestCopyIsWhole(t *testing.T) {
	text := string(read(t, from))
	lines := 0
	for line := range strings.SplitSeq(text, "\n") {
		if line != "" && line[0] != '#' {
			lines++
		}
	}
	if n := utf8.RuneCountInString(text); n != 30235 || lines != 224 {
		t.Errorf("got %d characters and %d lines of identifiers, want 30235 and 224", n, lines)
	}
	for _, notice := range []string{"GS1 AISBL", "BWIPP project", "Zint Project", "Apache License, Version 2.0"} {
		if !strings.Contains(text, notice) {
			t.Errorf("the copy does not say %q", notice)
		}
	}
	if licence := read(t, "dictionary/LICENSE"); !bytes.Contains(licence, []byte("Version 2.0, January 2004")) {
		t.Error("the licence beside the copy is not the Apache License, Version 2.0")
	}
}

// What the generator does not understand it refuses, so that a later state of
// the dictionary cannot be read half.
func TestRefused(t *testing.T) {
	for _, line := range []string{
		"01", "01 *?", "01 *? W14 # GTIN", "01 *? N # GTIN", "01 *? N..x # GTIN", "01 *? N14 needs=02 # GTIN", "01 *? [] # GTIN",
	} {
		if got, err := table(line + "\n"); err == nil {
			t.Errorf("%q: got %s, want an error", line, got)
		}
	}
}
