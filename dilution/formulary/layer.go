package formulary

import (
	"crypto/sha256"
	"encoding/hex"
	"fmt"
	"sort"
	"strings"

	"drawup/dilution/refusal"
)

// Layer reads a site's own files over base. A drug in them replaces the drug of
// the same name whole, any other is added; pairs and lists of names are added.
// What the site loosens must carry a reason and a source, else it is refused
// (rule R13): a figure in its own keys, anything else in a taken_away record.
//
// Files that name no base stand alone. A text whose name ends in .csv holds
// standard preparations (see ReadStandards).
func Layer(base *Formulary, texts ...Text) (*Formulary, refusal.List) {
	tomls, tables := parted(texts)
	if len(tomls) == 0 {
		return withStandards(base, tables)
	}
	site, faults := Read(tomls...)
	if site.Base == "" || faults.Refused() {
		whole, more := withStandards(site, tables)
		return whole, append(faults, more...)
	}
	if site.Base != base.Name && site.Base != base.Name+" "+base.Version {
		return site, append(faults, refusal.Reason{
			Code: refusal.ValueUnknown, Severity: refusal.Refuse, Field: "base", Got: site.Base,
			Want: base.Name + " " + base.Version, Rule: "R13", Pos: site.basePos,
			Message: fmt.Sprintf("the file builds on %q, and the formulary here is %q", site.Base, base.Name+" "+base.Version),
			Remedy:  "name the formulary that it was written against, and read what changed since: drawup formulary compare",
		})
	}
	whole := over(base, site)
	faults = append(faults, pairFaults(whole)...)
	faults = append(faults, repeatedNames(whole)...)
	faults = append(faults, unexplained(base, whole)...)
	whole, more := withStandards(whole, tables)
	return whole, append(faults, more...)
}

// over is base with the drugs of site in place of its own.
func over(base, site *Formulary) *Formulary {
	f := &Formulary{Name: site.Name, Version: site.Version, Base: base.Name + " " + base.Version,
		Digest: digestOf(base.Digest, site.Digest),
		Mixes:  append(append([]Mix{}, base.Mixes...), site.Mixes...),
		Never:  append(append([]NeverMix{}, base.Never...), site.Never...)}
	for _, t := range site.TallMan {
		f.TallMan = append(f.TallMan, t)
	}
	for _, t := range base.TallMan {
		if !hasList(f.TallMan, t.Jurisdiction) {
			f.TallMan = append(f.TallMan, t)
		}
	}
	own := map[string]bool{}
	for _, d := range site.drugs {
		own[d.Name] = true
		f.drugs = append(f.drugs, d)
	}
	for _, d := range base.drugs {
		if !own[d.Name] {
			f.drugs = append(f.drugs, d)
		}
	}
	sort.SliceStable(f.drugs, func(i, j int) bool { return f.drugs[i].Name < f.drugs[j].Name })
	return f
}

func hasList(lists []TallMan, jurisdiction string) bool {
	for _, t := range lists {
		if t.Jurisdiction == jurisdiction {
			return true
		}
	}
	return false
}

// digestOf binds two digests.
func digestOf(a, b string) string {
	sum := sha256.Sum256([]byte(a + "\n" + b))
	return hex.EncodeToString(sum[:])
}

// unexplained refuses what the newer formulary loosens without a reason.
func unexplained(base, newer *Formulary) refusal.List {
	var out refusal.List
	for _, c := range Compare(base, newer) {
		if !c.Loosened || c.Reason != "" || c.Entry.looser == present && c.Source.Key != "" {
			continue
		}
		if d, ok := newer.named(c.Drug); ok && d.explains(c.Name) {
			continue
		}
		pos := c.Entry.Pos
		if d, ok := newer.named(c.Drug); ok && c.New == "" {
			pos = d.Pos // the old figure's place is in the other file
		}
		out = append(out, refusal.Reason{
			Code: refusal.LimitLoosened, Severity: refusal.Refuse, Field: c.Name, Got: c.New, Want: c.Old,
			Rule: "R13", Source: c.Source.Title, Pos: pos,
			Message: c.String() + ", without a reason",
			Remedy: "write reason = \"…\" beside the figure and its source, or a [[drug.taken_away]] record with " +
				fmt.Sprintf("limit = %q", c.Name),
		})
	}
	return out
}

// explains reports that a taken_away record names the limit, or the whole row or
// presentation that it belongs to.
func (d Drug) explains(limit string) bool {
	for _, t := range d.TakenAway {
		if t.Limit == limit || strings.HasPrefix(limit, t.Limit+": ") {
			return true
		}
	}
	return false
}
