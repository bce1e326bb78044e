package order

import (
	"fmt"
	"os"
	"path/filepath"
	"slices"
	"sort"
	"strings"
	"testing"

	"drawup/dilution/refusal"
)

const refusedFolder = "../../testdata/refused/order"

// expectations reads the marks of a file: "line: code", sorted; line 0 stands
// for a reason of the whole file.
func expectations(text string) []string {
	var want []string
	for i, line := range strings.Split(text, "\n") {
		number, mark := i+1, "# want: "
		if strings.Contains(line, "# want file: ") {
			number, mark = 0, "# want file: "
		}
		_, codes, ok := strings.Cut(line, mark)
		if !ok {
			continue
		}
		for _, c := range strings.Split(codes, ",") {
			want = append(want, fmt.Sprintf("%d: %s", number, strings.TrimSpace(c)))
		}
	}
	sort.Strings(want)
	return want
}

func refusedFiles(t testing.TB) []string {
	files, err := filepath.Glob(refusedFolder + "/*.toml")
	if err != nil || len(files) < 10 {
		t.Fatalf("got %d files in %s, want at least 10 (%v)", len(files), refusedFolder, err)
	}
	return files
}

// Every reason is expected on its line, and every expected reason comes. The
// expected codes stand in the files, written by hand.
func TestRefusedOrders(t *testing.T) {
	for _, file := range refusedFiles(t) {
		t.Run(filepath.Base(file), func(t *testing.T) {
			data, err := os.ReadFile(file)
			if err != nil {
				t.Fatal(err)
			}
			_, list := Read(file, data)
			var got []string
			for _, r := range list {
				got = append(got, fmt.Sprintf("%d: %s", r.Pos.Line, r.Code))
				checkReason(t, r)
			}
			sort.Strings(got)
			want := expectations(string(data))
			if len(want) == 0 {
				t.Error("the file expects nothing")
			}
			if !slices.Equal(got, want) {
				t.Errorf("got\n%s\nwant\n%s\nreasons\n%v", strings.Join(got, "\n"), strings.Join(want, "\n"), list)
			}
		})
	}
}

// checkReason demands what every reason must say.
func checkReason(t *testing.T, r refusal.Reason) {
	t.Helper()
	e, known := refusal.Lookup(r.Code)
	if !known || !e.May(r.Severity) || r.Severity == refusal.Caution && r.Code != refusal.TextMisread && (r.Code != refusal.WeightImplausible || r.Syringe != 0) || r.Message == "" || r.Got == "" || r.Want == "" || r.Remedy == "" || r.Pos.File == "" {
		t.Errorf("a reason lacks a part: %+v", r)
	}
	if strings.HasSuffix(r.Message, ".") || strings.Contains(r.Message, "\n") && r.Code != refusal.ValueWrongType {
		t.Errorf("the message is not one plain sentence: %q", r.Message)
	}
}

// Every code that Read may give, beyond those of the file's bytes, stands in
// at least one file.
func TestEveryCodeHasAnExample(t *testing.T) {
	var all strings.Builder
	for _, file := range refusedFiles(t) {
		data, err := os.ReadFile(file)
		if err != nil {
			t.Fatal(err)
		}
		all.WriteString(strings.Join(expectations(string(data)), "\n") + "\n")
	}
	for _, code := range []refusal.Code{
		refusal.FileSyntax, refusal.KeyUnknown, refusal.KeyRepeated, refusal.KeyMissing, refusal.KeyConflict,
		refusal.ValueWrongType, refusal.ValueUnknown, refusal.TimeMalformed, refusal.NothingToMake,
		refusal.QuantityMissing, refusal.NumberWithComma, refusal.NumberMalformed, refusal.NumberTooLong,
		refusal.UnitUnknown, refusal.UnitWrongKind, refusal.QuantityZero, refusal.RatioStrength, refusal.AmountKindDiffer,
		refusal.WeightMissing, refusal.WeightImplausible, refusal.HeightMissing, refusal.HeightImplausible,
		refusal.SexMissing, refusal.BodyValuesStrange,
	} {
		if !strings.Contains(all.String(), ": "+string(code)+"\n") {
			t.Errorf("no file in %s gives %s", refusedFolder, code)
		}
	}
}
