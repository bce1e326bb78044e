package main

import (
	"os"
	"path/filepath"
	"strings"
	"testing"

	"drawup/layouts/pdf/readback"
)

// The names of the label as another renderer reads them: the list's form as it
// stands (US regulator's list: DOPamine), and the other name in brackets.
func TestNamesOnTheLabel(t *testing.T) {
	text, err := os.ReadFile("../../testdata/script/names.txtar")
	if err != nil {
		t.Fatal(err)
	}
	_, order, _ := strings.Cut(string(text), "-- order.toml --\n")
	order, _, _ = strings.Cut(order, "-- other.toml --")
	dir := t.TempDir()
	path := filepath.Join(dir, "order.toml")
	if err := os.WriteFile(path, []byte(order), 0o600); err != nil {
		t.Fatal(err)
	}
	told("prepare", path, "--out", dir)(t)
	data, err := os.ReadFile(filepath.Join(dir, "labels.pdf"))
	if err != nil {
		t.Fatal(err)
	}
	file := readback.Open(t, data)
	var pages strings.Builder
	for i := range file.Pages() {
		for _, word := range file.Text(i + 1) {
			pages.WriteString(word.Text + " ")
		}
	}
	for _, want := range []string{"DOPamine", "Epinephrine", "(adrenaline)"} {
		if !strings.Contains(pages.String(), want) {
			t.Errorf("the labels do not say %q: %s", want, pages.String())
		}
	}
	if strings.Contains(pages.String(), "Dopamine") {
		t.Error("the list's form was changed")
	}
}
