package main

import (
	"path/filepath"
	"slices"
	"time"

	"drawup/dilution"
	"drawup/dilution/formulary"
	"drawup/dilution/refusal"
	"drawup/dilution/tomlfile"
)

// A library is the formulary that a run works from, and the approval that was
// named for it. Whether the approval holds depends on the time of the work.
type library struct {
	form     *formulary.Formulary
	approval *formulary.Approval // nil when none was named
	bench    dilution.Bench      // the shelf, where one was named
	shelf    []byte              // its text; part of what the papers are worked from
}

// formularyFlags names the site's own files.
type formularyFlags struct {
	files    []string
	approval string
}

// libraryOf reads the starter, a site's own files over it, and the approval.
func libraryOf(flags formularyFlags) (library, refusal.List) {
	starter, err := formulary.Default()
	if err != nil {
		return library{}, refusal.List{ourFault(0, err)}
	}
	lib := library{form: starter}
	texts, faults := textsOf(flags.files)
	if faults.Refused() {
		return lib, faults
	}
	if len(texts) > 0 {
		lib.form, faults = formulary.Layer(starter, texts...)
	}
	if flags.approval == "" || faults.Refused() {
		return lib, faults
	}
	data, bad := tomlfile.ReadFile(flags.approval)
	if bad.Refused() {
		return lib, append(faults, bad...)
	}
	a, bad := formulary.ReadApproval(formulary.Text{Name: flags.approval, Data: data})
	lib.approval = &a
	return lib, append(faults, bad...)
}

// textsOf reads files whole. Their order on the command line does not matter.
func textsOf(files []string) ([]formulary.Text, refusal.List) {
	var texts []formulary.Text
	var faults refusal.List
	sorted := slices.Clone(files)
	slices.Sort(sorted)
	for _, name := range slices.Compact(sorted) {
		data, bad := tomlfile.ReadFile(name)
		faults = append(faults, bad...)
		texts = append(texts, formulary.Text{Name: filepath.ToSlash(name), Data: data})
	}
	return texts, faults
}

// at is the formulary as it stands at a time: approved, or not.
func (l library) at(t time.Time) (*formulary.Formulary, refusal.List) {
	if l.approval == nil {
		return l.form, nil
	}
	return l.form.Approve(*l.approval, t)
}
