package formulary_test

import (
	"fmt"
	"os"
	"path/filepath"
	"slices"
	"sort"
	"strings"
	"testing"

	"drawup/dilution/formulary"
	"drawup/dilution/refusal"
)

// Every fault of a formulary is told at once, each on its line. The expected
// codes stand in the files, written by hand.
func TestRefusedFormularies(t *testing.T) {
	refusedFiles(t, "formulary", func(x formulary.Text) refusal.List {
		_, list := formulary.Read(x)
		return list
	})
}

// A site's file that loosens the starter in silence, and one that builds on
// another formulary. A file that drops a record loosens many entries on one
// line; each line and code counts once.
func TestRefusedSites(t *testing.T) {
	refusedFiles(t, "site", func(x formulary.Text) refusal.List {
		_, list := formulary.Layer(starter(t), x)
		seen := map[string]bool{}
		return slices.DeleteFunc(list, func(r refusal.Reason) bool {
			key := fmt.Sprint(r.Pos.Line, r.Code)
			if seen[key] {
				return true
			}
			seen[key] = true
			return false
		})
	})
}

func TestRefusedApprovals(t *testing.T) {
	refusedFiles(t, "approval", func(x formulary.Text) refusal.List {
		_, list := formulary.ReadApproval(x)
		return list
	})
}

// refusedFiles reads every file of a folder and holds the reasons against the
// codes at the ends of its lines.
func refusedFiles(t *testing.T, folder string, read func(formulary.Text) refusal.List) {
	t.Helper()
	files, err := filepath.Glob("../../testdata/refused/" + folder + "/*.toml")
	if err != nil || len(files) < 2 {
		t.Fatalf("got %d files (%v)", len(files), err)
	}
	for _, file := range files {
		t.Run(filepath.Base(file), func(t *testing.T) {
			data, err := os.ReadFile(file)
			if err != nil {
				t.Fatal(err)
			}
			list := read(formulary.Text{Name: file, Data: data})
			var got, want []string
			for _, r := range list {
				got = append(got, fmt.Sprintf("%d: %s", r.Pos.Line, r.Code))
				if r.Severity != refusal.Refuse || r.Message == "" || r.Want == "" || r.Remedy == "" || r.Pos.File != file {
					t.Errorf("a reason lacks a part: %+v", r)
				}
			}
			for i, line := range strings.Split(string(data), "\n") {
				if _, codes, ok := strings.Cut(line, "# want: "); ok {
					for code := range strings.SplitSeq(codes, ", ") {
						want = append(want, fmt.Sprintf("%d: %s", i+1, code))
					}
				}
			}
			sort.Strings(got)
			sort.Strings(want)
			if !slices.Equal(got, want) {
				t.Errorf("got\n%s\nwant\n%s\nreasons\n%v", strings.Join(got, "\n"), strings.Join(want, "\n"), list)
			}
		})
	}
}

// Files of one formulary must agree on name and version.
func TestFilesOfOneFormularyAgree(t *testing.T) {
	text := func(version string) formulary.Text {
		return formulary.Text{Name: version + ".toml", Data: []byte("name = \"one\"\nversion = \"" + version + "\"\n")}
	}
	if _, list := formulary.Read(text("1"), text("1")); list.Refused() {
		t.Errorf("got %v for two files that agree", list)
	}
	_, list := formulary.Read(text("1"), text("2"))
	if got := list.Codes(); !slices.Equal(got, []refusal.Code{refusal.KeyConflict}) || list[0].Pos.File != "2.toml" {
		t.Errorf("got %v, want %s in the second file", list, refusal.KeyConflict)
	}
}

// The digest follows the bytes: a changed figure can be told from the paper.
func TestDigest(t *testing.T) {
	read := func(s string) string {
		f, _ := formulary.Read(formulary.Text{Name: "a.toml", Data: []byte(s)})
		return f.Digest
	}
	a, b := read("name = \"one\"\nversion = \"1\"\n"), read("name = \"one\"\nversion = \"1\"\n ")
	if len(a) != 64 || a == b || a != read("name = \"one\"\nversion = \"1\"\n") {
		t.Errorf("got digests %s and %s", a, b)
	}
}
