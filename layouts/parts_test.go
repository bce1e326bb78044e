package layouts_test

import (
	"testing"

	"drawup/layouts"
)

// A long list is cut into parts that lose no label, keep the order, hold no
// more than asked for, and but for the last end with a full sheet.
func TestParts(t *testing.T) {
	list := batch(5000)
	s := stock(t, "a4-65")
	for _, c := range []struct{ used, most int }{{0, 0}, {0, 2000}, {7, 2000}, {64, 100}, {0, 65}, {0, 10}, {3, 1}} {
		most := c.most
		if most == 0 {
			most = layouts.PartSize
		}
		next := 0
		parts := layouts.Parts(list, s, c.used, c.most)
		for i, part := range parts {
			if len(part) == 0 || len(part) > most {
				t.Fatalf("%+v: got a part of %d", c, len(part))
			}
			used := 0
			if i == 0 {
				used = c.used
			}
			if i < len(parts)-1 && most >= 130 && (used+len(part))%65 != 0 {
				t.Errorf("%+v: part %d of %d labels leaves a sheet half empty", c, i+1, len(part))
			}
			for _, l := range part {
				if next++; l.Number != next {
					t.Fatalf("%+v: got label %d, want %d", c, l.Number, next)
				}
			}
		}
		if next != len(list) {
			t.Errorf("%+v: got %d labels in all", c, next)
		}
	}
	if got := layouts.Parts(nil, s, 0, 10); got != nil {
		t.Errorf("got %d parts of nothing", len(got))
	}
	// Parts of 2,000 labels on sheets of 65: 30 full sheets each.
	if got := layouts.Parts(list, s, 0, 2000); len(got) != 3 || len(got[0]) != 1950 {
		t.Errorf("got %d parts, the first of %d", len(got), len(got[0]))
	}
}
