package layouts

import "drawup/labels"

// PartSize is how many labels a file holds at most when a job is cut into
// several: up to it, the memory that a job takes grows with its length; with
// each part placed, written and let go before the next, no further.
const PartSize = 2000

// Parts cuts a list into runs of at most most labels, each to be given to
// Labels by itself and written to a file of its own: pages are numbered anew
// in each. A run ends with a full page where most allows it, so that no sheet
// is left half empty; used is the number of labels already used on the first
// sheet of the first part, Options.Used there and 0 in the others. The runs
// share the memory of list. A most under 1 counts as PartSize.
func Parts(list []labels.Label, s Stock, used, most int) [][]labels.Label {
	if most < 1 {
		most = PartSize
	}
	if s.Roll() {
		used = 0
	}
	var out [][]labels.Label
	for len(list) > 0 {
		n := most
		if per := s.PerPage(); n < len(list) && (n+used)/per > 0 && (n+used)/per*per > used {
			n = (n+used)/per*per - used
		}
		n = min(n, len(list))
		out = append(out, list[:n:n])
		list, used = list[n:], 0
	}
	return out
}
