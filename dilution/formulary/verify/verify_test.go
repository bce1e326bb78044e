package verify_test

import (
	"fmt"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"drawup/dilution/formulary"
	"drawup/dilution/formulary/verify"
	"drawup/dilution/refusal"
)

// The shipped formulary has no finding.
func TestStarterHasNoFinding(t *testing.T) {
	f, err := formulary.Default()
	if err != nil {
		t.Fatal(err)
	}
	for _, r := range verify.Check(f) {
		t.Errorf("%s:%d: %s: %s; got %q, want %s", r.Pos.File, r.Pos.Line, r.Code, r.Message, r.Got, r.Want)
	}
}

// Each faulty file gives exactly the findings that its lines ask for.
func TestFindings(t *testing.T) {
	files, err := filepath.Glob("../../../testdata/refused/verify/*.toml")
	if err != nil || len(files) == 0 {
		t.Fatalf("no files: %v", err)
	}
	for _, file := range files {
		t.Run(filepath.Base(file), func(t *testing.T) {
			data, err := os.ReadFile(file)
			if err != nil {
				t.Fatal(err)
			}
			f, faults := formulary.Read(formulary.Text{Name: file, Data: data})
			if faults.Refused() {
				t.Fatalf("the reader refuses it: %v", faults)
			}
			var got, want []string
			found := verify.Check(f)
			for _, r := range found {
				got = append(got, fmt.Sprintf("%d: %s", r.Pos.Line, r.Code))
				if r.Severity != refusal.Refuse || r.Pos.File != file || r.Pos.Column == 0 || r.Message == "" || r.Want == "" || r.Remedy == "" {
					t.Errorf("got a finding without its parts: %+v", r)
				}
			}
			for i, line := range strings.Split(string(data), "\n") {
				if _, codes, ok := strings.Cut(line, "# want: "); ok {
					for _, c := range strings.Split(codes, ",") {
						want = append(want, fmt.Sprintf("%d: %s", i+1, strings.TrimSpace(c)))
					}
				}
			}
			slices.Sort(got)
			slices.Sort(want)
			if !slices.Equal(got, want) {
				t.Errorf("got\n%s\nwant\n%s\n%v", strings.Join(got, "\n"), strings.Join(want, "\n"), found)
			}
		})
	}
}

// The whole starter at once, as drawup formulary verify does it.
func BenchmarkStarter(b *testing.B) {
	f, err := formulary.Default()
	if err != nil {
		b.Fatal(err)
	}
	b.ReportAllocs()
	for b.Loop() {
		verify.Check(f)
	}
}
