package verify_test

import (
	"os"
	"path/filepath"
	"testing"

	"drawup/dilution/formulary"
	"drawup/dilution/formulary/verify"
)

// Any formulary that reads can be verified, and every finding has its parts.
func FuzzCheck(f *testing.F) {
	files, err := filepath.Glob("../../../testdata/refused/verify/*.toml")
	if err != nil || len(files) == 0 {
		f.Fatalf("no files: %v", err)
	}
	for _, file := range files {
		data, err := os.ReadFile(file)
		if err != nil {
			f.Fatal(err)
		}
		f.Add(string(data))
	}
	f.Fuzz(func(t *testing.T, text string) {
		got, faults := formulary.Read(formulary.Text{Name: "f.toml", Data: []byte(text)})
		if faults.Refused() {
			return
		}
		for _, r := range verify.Check(got) {
			if r.Message == "" || r.Want == "" || r.Remedy == "" || r.Pos.File == "" {
				t.Errorf("got a finding without its parts: %+v", r)
			}
		}
	})
}
