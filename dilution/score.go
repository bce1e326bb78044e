package dilution

import (
	"fmt"
	"math/big"
)

// A point is one thing by which ways are compared, the less the better. Its text,
// "2 containers", is written only where somebody wants to know.
type point struct {
	value *big.Rat
	text  func() string
}

// comparePoints puts the better list first; a way without points, which cannot be
// made, goes last.
func comparePoints(a, b []point) int {
	if (a == nil) != (b == nil) {
		if a == nil {
			return 1
		}
		return -1
	}
	i := firstUnlike(a, b)
	if i < 0 {
		return 0
	}
	return a[i].value.Cmp(b[i].value)
}

// firstUnlike is the first point in which two lists differ, -1 where there is
// none.
func firstUnlike(a, b []point) int {
	for i := range min(len(a), len(b)) {
		if a[i].value.Cmp(b[i].value) != 0 {
			return i
		}
	}
	return -1
}

// score is what counts between ways that can be mixed, in this order:
//
//  1. the drawn volume stands on a line and fills a fifth of its barrel;
//  2. fewest containers;
//  3. least drug left over, which is all in one container;
//  4. fewest sizes of container;
//  5. fewest acts: nothing to mix from powder, nothing to dilute;
//  6. the place on the shelf.
//
// The first is rule R8; two to four are how people open ampoules; the fifth is
// what error studies ask for (Garnerin et al., Eur J Clin Pharmacol 2007).
func (w *work) score(place int) []point {
	m, s := w.plan.Mixture, w.plan.Style
	r := m.DrugReading
	off, measured := int64(0), func() string { return s.Volume(m.DrugVolume) + " on a line" }
	if r.MovedPercent.Sign() != 0 {
		off, measured = off+1, func() string { return s.Volume(m.DrugWanted) + " between lines" }
	}
	if r.UnderFifth {
		off, measured = off+1, func() string { return s.Volume(m.DrugVolume) + " under a fifth of its barrel" }
	}
	acts, done := int64(0), "drawn as it is"
	if m.Method != Neat {
		acts, done = acts+1, "diluted"
	}
	if w.plan.Presentation.Powder() {
		acts, done = acts+1, "mixed from powder"
	}
	whole := func(n int64, text func() string) point { return point{big.NewRat(n, 1), text} }
	return []point{
		whole(off, measured),
		whole(int64(m.Containers), func() string { return counting(m.Containers, "container") }),
		{m.LeftAmount.Rat(), func() string { return s.Amount(m.LeftAmount) + " left over" }},
		whole(int64(len(m.Packs)), func() string { return counting(len(m.Packs), "size") + " of container" }),
		whole(acts, func() string { return done }),
		whole(int64(place), func() string { return fmt.Sprintf("place %d on the shelf", place+1) }),
	}
}

// counting is "1 container", "2 containers".
func counting(n int, word string) string {
	if n == 1 {
		return "1 " + word
	}
	return fmt.Sprintf("%d %ss", n, word)
}
