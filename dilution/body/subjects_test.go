package body

import (
	"encoding/csv"
	"os"
	"testing"
)

// TestSubjects holds the 65 subjects of the remifentanil data set (R package
// nlme): the surface area by Du Bois and the lean weight by James, all 130
// figures to the four decimals that the data set prints.
func TestSubjects(t *testing.T) {
	file, err := os.Open("../../testdata/vectors/subjects.csv")
	if err != nil {
		t.Fatal(err)
	}
	defer file.Close()
	rows, err := csv.NewReader(file).ReadAll()
	if err != nil || len(rows) != 66 {
		t.Fatalf("got %d rows, %v, want a header and 65 subjects", len(rows), err)
	}
	for _, row := range rows[1:] {
		sex, ok := SexNamed(row[1])
		if !ok {
			t.Fatalf("subject %s: sex %q", row[0], row[1])
		}
		s := sized(t, sex, row[3], row[4])
		area, err := s.DuBois()
		if err != nil {
			t.Fatal(err)
		}
		lean, err := s.James()
		if err != nil {
			t.Fatal(err)
		}
		for want, got := range map[string]string{row[5]: area.Rat().FloatString(4), row[6]: lean.Rat().FloatString(4)} {
			if padded(want) != got {
				t.Errorf("subject %s: got %s, want %s", row[0], got, want)
			}
		}
	}
}

// padded is a printed figure with the zeros at its end that a table drops.
func padded(s string) string {
	for places(s) < 4 {
		if places(s) == 0 {
			s += "."
		}
		s += "0"
	}
	return s
}
