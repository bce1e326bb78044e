package formulary

import (
	"fmt"
	"slices"
	"sort"
	"strings"
)

// A Change is one difference between two formularies.
type Change struct {
	Drug     string // "" for pairs of drugs
	Name     string // of the entry
	Old, New string // as written; "" for none
	Verb     string // added, taken away, raised, lowered, changed
	Loosened bool   // it lets through what the old one did not
	Reason   string // what the new file says of it
	Source   Source // of the new figure, else of the old
	Entry    Entry  // the new one, else the old
}

// String is the change in a sentence.
func (c Change) String() string {
	what := c.Name
	if c.Drug != "" {
		what = c.Drug + ": " + what
	}
	switch {
	case c.Old == "":
		return fmt.Sprintf("%s added: %s", what, c.New)
	case c.New == "":
		return fmt.Sprintf("%s taken away; it was %s", what, c.Old)
	}
	return fmt.Sprintf("%s %s from %s to %s", what, c.Verb, c.Old, c.New)
}

// Compare lists what the newer formulary says otherwise than the older one:
// what was loosened first, then drug by drug, entry by entry. A change whose
// direction cannot be told, as from mg/kg to mg, counts as loosened.
func Compare(older, newer *Formulary) []Change {
	var out []Change
	seen := map[string]bool{}
	for _, d := range older.drugs {
		seen[d.Name] = true
		n, ok := newer.named(d.Name)
		if !ok {
			out = append(out, Change{Drug: d.Name, Name: "the drug", Old: "filed", Verb: "taken away", Entry: Entry{Pos: d.Pos}})
			continue
		}
		out = append(out, compareEntries(d.Name, d.Entries(), n.Entries())...)
	}
	for _, d := range newer.drugs {
		if !seen[d.Name] {
			out = append(out, Change{Drug: d.Name, Name: "the drug", New: "filed", Verb: "added", Entry: Entry{Pos: d.Pos}})
		}
	}
	out = append(out, compareEntries("", older.PairEntries(), newer.PairEntries())...)
	sort.SliceStable(out, func(i, j int) bool {
		if out[i].Loosened != out[j].Loosened {
			return out[i].Loosened
		}
		return out[i].Drug < out[j].Drug
	})
	return out
}

// named finds a drug by the name under which it is filed.
func (f *Formulary) named(name string) (Drug, bool) {
	for _, d := range f.drugs {
		if d.Name == name {
			return d, true
		}
	}
	return Drug{}, false
}

// numbered gives each entry a key of its own: entries of one name are numbered
// in their order.
func numbered(list []Entry) (keys []string, of map[string]Entry) {
	of = map[string]Entry{}
	for _, e := range list {
		key := e.Name
		for n := 2; ; n++ {
			if _, taken := of[key]; !taken {
				break
			}
			key = fmt.Sprintf("%s (%d)", e.Name, n)
		}
		of[key] = e
		keys = append(keys, key)
	}
	return keys, of
}

func compareEntries(drug string, older, newer []Entry) []Change {
	var out []Change
	oldKeys, oldOf := numbered(older)
	newKeys, newOf := numbered(newer)
	for _, k := range oldKeys {
		was := oldOf[k]
		is, ok := newOf[k]
		switch {
		case !ok:
			out = append(out, Change{Drug: drug, Name: k, Old: was.Text, Verb: "taken away",
				Loosened: was.looser == upwards || was.looser == downward || was.looser == absent, Source: was.Source, Entry: was})
		default:
			if c, changed := changeOf(drug, k, was, is); changed {
				out = append(out, c)
			} else {
				out = append(out, standing(drug, k, was, is)...)
			}
		}
	}
	for _, k := range newKeys {
		if _, ok := oldOf[k]; !ok {
			is := newOf[k]
			out = append(out, Change{Drug: drug, Name: k, New: is.Text, Verb: "added",
				Loosened: is.looser == present || besideOld(k, is, oldKeys), Reason: is.Reason, Source: is.Source, Entry: is})
		}
	}
	return out
}

// besideOld reports a limit that is new beside older ones of the same purpose.
// Rows of one purpose are alternatives, the mildest of which holds, so that one
// more may let through what the others do not.
func besideOld(key string, is Entry, oldKeys []string) bool {
	if is.looser != upwards && is.looser != downward {
		return false
	}
	purpose, _, _ := strings.Cut(key, ",")
	row, _, _ := strings.Cut(key, ": ")
	for _, k := range oldKeys {
		if strings.HasPrefix(k, row+": ") {
			return false // one more figure of an old row binds it further
		}
	}
	return slices.ContainsFunc(oldKeys, func(k string) bool { return strings.HasPrefix(k, purpose+",") })
}

// changeOf compares two texts of one entry; texts that mean the same, such as
// 1 mg and 1000 microgram, are no change.
func changeOf(drug, name string, was, is Entry) (Change, bool) {
	c := Change{Drug: drug, Name: name, Old: was.Text, New: is.Text, Verb: "changed", Reason: is.Reason, Source: is.Source, Entry: is}
	if is.Text == was.Text {
		return c, false
	}
	n, comparable := is.order(was)
	switch {
	case !comparable:
		c.Loosened = was.looser != neither && was.looser != present
		return c, true
	case n == 0:
		return c, false
	case n > 0:
		c.Verb, c.Loosened = "raised", was.looser == upwards
	case n < 0:
		c.Verb, c.Loosened = "lowered", was.looser == downward
	}
	return c, true
}

// standing tells what a figure that stays rests on now, where that is another
// document, or where it is no longer marked unverified, or now is.
func standing(drug, name string, was, is Entry) []Change {
	var out []Change
	for _, x := range []struct{ what, old, new string }{
		{": source", was.Source.Title, is.Source.Title}, {": standing", was.standing(), is.standing()},
	} {
		if x.old != x.new {
			out = append(out, Change{Drug: drug, Name: name + x.what, Old: x.old, New: x.new, Verb: "changed", Reason: is.Reason, Source: is.Source, Entry: is})
		}
	}
	return out
}

func (x Entry) standing() string {
	switch {
	case x.VerifiedBy != "":
		return "verified by " + x.VerifiedBy
	case x.Unverified:
		return "unverified"
	}
	return "not marked"
}
