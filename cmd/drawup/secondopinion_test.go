//go:build secondopinion

// The tests behind this build tag repeat what the other tests say of PDFs and
// barcodes with other people's programs: poppler, qpdf, Ghostscript and
// dmtxread. .ci/run installs them. A program that is absent fails the test and
// is named; nothing is passed over.
package main

import (
	"bytes"
	"os"
	"os/exec"
	"path/filepath"
	"slices"
	"strings"
	"syscall"
	"testing"

	"drawup/labels"
)

// tool runs a program and returns what it printed.
func tool(t *testing.T, name string, args ...string) string {
	t.Helper()
	if _, err := exec.LookPath(name); err != nil {
		t.Fatalf("%s is absent; .ci/run installs it", name)
	}
	var out, errs bytes.Buffer
	c := exec.Command(name, args...)
	c.Stdout, c.Stderr = &out, &errs
	if err := c.Run(); err != nil {
		t.Fatalf("%s %v: %v\n%s", name, args, err, errs.String())
	}
	return out.String()
}

func pdfs(dir string) []string {
	var out []string
	for _, name := range []string{"draw-up.pdf", "labels.pdf", "pump-cards.pdf", "check-sheets.pdf"} {
		out = append(out, filepath.Join(dir, name))
	}
	return out
}

// qpdf finds no fault in structure or streams.
func TestSecondOpinionStructure(t *testing.T) {
	for _, path := range pdfs(prepared(t)) {
		if out := tool(t, "qpdf", "--check", path); !strings.Contains(out, "No syntax or stream encoding errors found") {
			t.Errorf("%s: %s", filepath.Base(path), out)
		}
	}
}

// Ghostscript draws every page without a complaint.
func TestSecondOpinionDraws(t *testing.T) {
	for _, path := range pdfs(prepared(t)) {
		if out := tool(t, "gs", "-dBATCH", "-dNOPAUSE", "-dQUIET", "-sDEVICE=nullpage", path); strings.TrimSpace(out) != "" {
			t.Errorf("%s: %s", filepath.Base(path), out)
		}
	}
}

// poppler reads every figure of every sheet, and every line of every label.
func TestSecondOpinionText(t *testing.T) {
	j := demoJob(t)
	dir := prepared(t)
	for name, kind := range map[string]string{"draw-up.pdf": "draw-up", "pump-cards.pdf": "pump", "check-sheets.pdf": "check"} {
		text := squeeze(tool(t, "pdftotext", "-raw", filepath.Join(dir, name), "-"))
		for _, figure := range sheetTexts(j, kind) {
			if !strings.Contains(text, squeeze(figure)) {
				t.Errorf("%s: poppler does not read %q", name, figure)
			}
		}
	}
	text := squeeze(tool(t, "pdftotext", "-raw", filepath.Join(dir, "labels.pdf"), "-"))
	for _, l := range j.labels {
		for _, want := range []string{l.Name, l.Concentration.Text, l.UseBy.Text(), l.Class.Word, l.Serial.Text} {
			if !strings.Contains(text, squeeze(want)) {
				t.Errorf("labels.pdf: poppler does not read %q of syringe %d", want, l.Number)
			}
		}
	}
}

// dmtxread finds and reads the barcode of every label in poppler's picture of
// the page, and each says what plan.json says.
func TestSecondOpinionBarcodes(t *testing.T) {
	j := demoJob(t)
	dir := prepared(t)
	tool(t, "pdftoppm", "-r", "300", "-png", filepath.Join(dir, "labels.pdf"), filepath.Join(dir, "page"))
	pages, err := filepath.Glob(filepath.Join(dir, "page*.png"))
	if err != nil || len(pages) == 0 {
		t.Fatalf("no pictures: %v", err)
	}
	var read strings.Builder
	for _, p := range pages {
		read.WriteString(tool(t, "dmtxread", "-n", "-G29", "-m30000", p) + "\n")
	}
	missed := 0
	for _, l := range j.labels {
		if !slices.ContainsFunc(l.Codes, func(c labels.Cell) bool { return strings.Contains(read.String(), symbolText(c.Text)) }) {
			missed++
			t.Logf("dmtxread does not find one of %v", l.Codes)
		}
	}
	if missed > 0 {
		t.Errorf("dmtxread missed %d of %d symbols", missed, len(j.labels))
	}
}

// A full disk leaves nothing half-written: no file of the set, no temporary
// file, and the exit code of a refusal. It needs the right to mount.
func TestSecondOpinionFullDisk(t *testing.T) {
	dir := t.TempDir()
	if err := syscall.Mount("tmpfs", dir, "tmpfs", 0, "size=64k"); err != nil {
		t.Fatalf("a small disk cannot be mounted here (%v); run as root", err)
	}
	defer syscall.Unmount(dir, 0)
	out := filepath.Join(dir, "out")
	var stdout, stderr bytes.Buffer
	if code := run([]string{"prepare", demo, "--out", out}, strings.NewReader(""), &stdout, &stderr); code != exitRefused {
		t.Errorf("exit %d, want %d", code, exitRefused)
	}
	if !strings.Contains(stderr.String(), "output-unwritable") || stdout.Len() != 0 {
		t.Errorf("stdout %q, stderr %q", stdout.String(), stderr.String())
	}
	if _, err := os.Stat(out); !os.IsNotExist(err) {
		t.Errorf("the folder is left behind: %v", err)
	}
}

// Ten thousand plans at random over the whole starter formulary, in all house
// styles: nothing that their papers say is known to be misread.
func TestSecondOpinionTenThousandPlans(t *testing.T) { readRandomPlans(t, 10_000) }
