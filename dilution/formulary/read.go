package formulary

import (
	"cmp"
	"crypto/sha256"
	"embed"
	"encoding/hex"
	"errors"
	"fmt"
	"io/fs"
	"regexp"
	"sort"
	"sync"

	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/dilution/tomlfile"
)

//go:embed starter/*.toml
var starter embed.FS

// A Text is one formulary file: its name, for messages, and its bytes.
type Text struct {
	Name string
	Data []byte
}

// DefaultTexts is the embedded starter formulary, in order of file name.
func DefaultTexts() ([]Text, error) {
	names, err := fs.Glob(starter, "starter/*.toml")
	if err != nil {
		return nil, err
	}
	sort.Strings(names)
	var texts []Text
	for _, n := range names {
		data, err := starter.ReadFile(n)
		if err != nil {
			return nil, err
		}
		texts = append(texts, Text{Name: n, Data: data})
	}
	return texts, nil
}

// Default is the embedded starter formulary. It is checked by the tests, row
// by row, so a refusal here is a fault of ours.
//
// It is read once: the value never changes, and reading it takes longer than
// most of what is asked of it.
func Default() (*Formulary, error) { return starterOnce() }

var starterOnce = sync.OnceValues(readStarter)

func readStarter() (*Formulary, error) {
	texts, err := DefaultTexts()
	if err != nil {
		return nil, err
	}
	f, faults := Read(texts...)
	if faults.Refused() {
		return nil, faults
	}
	return f, nil
}

// Read reads one formulary from one or more files and reports every fault
// with its place. The files must agree on name and version; a drug may stand
// in one file only.
func Read(texts ...Text) (*Formulary, refusal.List) {
	f := &Formulary{}
	var all refusal.List
	sum := sha256.New()
	for i, r := range readAll(texts) {
		sum.Write(texts[i].Data)
		if r.whole {
			r.join(f)
		}
		all = append(all, r.faults...)
	}
	f.Digest = hex.EncodeToString(sum.Sum(nil))
	sort.SliceStable(f.drugs, func(i, j int) bool { return f.drugs[i].Name < f.drugs[j].Name })
	all = append(all, repeatedNames(f)...)
	all = append(all, pairFaults(f)...)
	return f, all
}

// readAll reads each file by itself, all at once: the starter is most of a
// quick sum's time. The order of the readers is that of the texts.
func readAll(texts []Text) []*reader {
	readers := make([]*reader, len(texts))
	var wait sync.WaitGroup
	for i, t := range texts {
		readers[i] = &reader{text: t}
		wait.Go(readers[i].file)
	}
	wait.Wait()
	return readers
}

// join adds what the file holds to f; files of one formulary must agree.
func (r *reader) join(f *Formulary) {
	if f.Name == "" {
		f.Name, f.Version, f.Base, f.basePos = r.part.Name, r.part.Version, r.part.Base, r.part.basePos
	}
	if r.part.Base != f.Base {
		r.fault(refusal.KeyConflict, r.part.Base, f.Base, "the files of one formulary must build on the same base", "base")
	}
	if r.part.Name == "" || r.part.Name != f.Name || r.part.Version != f.Version {
		r.fault(refusal.KeyConflict, r.part.Name+" "+r.part.Version, f.Name+" "+f.Version,
			"the files of one formulary must carry one name and one version", "name")
	}
	f.drugs = append(f.drugs, r.part.drugs...)
	f.Mixes = append(f.Mixes, r.part.Mixes...)
	f.Never = append(f.Never, r.part.Never...)
	f.TallMan = append(f.TallMan, r.part.TallMan...)
}

// repeatedNames finds names that would fetch two drugs.
func repeatedNames(f *Formulary) refusal.List {
	var out refusal.List
	seen := map[string]string{}
	for _, d := range f.drugs {
		for _, n := range d.allNames() {
			if other, ok := seen[n]; ok {
				out = append(out, refusal.Reason{
					Code: refusal.KeyRepeated, Severity: refusal.Refuse,
					Field: "drug.name", Got: n,
					Rule: "R10", Pos: d.Pos,
					Want:    "one drug for each name",
					Message: fmt.Sprintf("the name %q finds both %s and %s", n, other, d.Name),
					Remedy:  "take the name out of one of them",
				})
			}
			seen[n] = d.Name
		}
	}
	return out
}

// jurisdictionPattern is the shape of a jurisdiction.
var jurisdictionPattern = regexp.MustCompile(`^([A-Z]{2}|international)$`)

// reader turns one file into drugs and keeps the faults it meets.
type reader struct {
	text    Text
	places  *tomlfile.Places
	sources map[string]Source
	used    map[string]bool
	faults  refusal.List
	part    Formulary // what this file holds
	whole   bool      // the file could be read at all
}

func (r *reader) fault(code refusal.Code, got, want, message string, path ...any) {
	pos := refusal.Pos{File: r.text.Name}
	if r.places != nil {
		pos = r.places.Of(path...)
	}
	r.faults = append(r.faults, refusal.Reason{
		Code: code, Severity: refusal.Refuse,
		Field: fmt.Sprint(path[len(path)-1]), Got: got,
		Want: want, Rule: "R10",
		Pos:     pos,
		Message: message,
		Remedy:  "mend the formulary file",
	})
}

func (r *reader) file() {
	var rec fileRecord
	places, faults := tomlfile.Decode(r.text.Name, r.text.Data, &rec)
	r.places, r.used = places, map[string]bool{}
	r.faults = append(r.faults, faults...)
	if faults.Refused() {
		return
	}
	f := &r.part
	f.Name, f.Version, f.Base, f.basePos, r.whole = rec.Name, rec.Version, rec.Base, places.Of("base"), true
	r.readSources(rec.Sources)
	for i, d := range rec.Drugs {
		one := r.drug(d, i)
		one.From = rec.Name + " " + rec.Version
		f.drugs = append(f.drugs, one)
	}
	r.readPairs(f, rec)
	r.unusedSources()
}

func (r *reader) readSources(list map[string]sourceRecord) {
	r.sources = map[string]Source{}
	for key, s := range list {
		if s.Title == "" || !contains([]string{"A", "B", "C", "P"}, s.Grade) {
			r.fault(refusal.KeyMissing, s.Grade, "a title and a grade A, B, C or P",
				"the source "+key+" is not spelled out", "sources", key)
		}
		if s.Jurisdiction != "" && !jurisdictionPattern.MatchString(s.Jurisdiction) {
			r.fault(refusal.ValueUnknown, s.Jurisdiction, `two capital letters such as "UK", or "international"`,
				"the jurisdiction of the source "+key+" is not one", "sources", key)
		}
		r.sources[key] = Source{Key: key, Title: s.Title, Grade: s.Grade, Jurisdiction: s.Jurisdiction}
	}
}

func (r *reader) unusedSources() {
	var keys []string
	for key := range r.sources {
		if !r.used[key] {
			keys = append(keys, key)
		}
	}
	sort.Strings(keys)
	for _, key := range keys {
		r.fault(refusal.ValueUnknown, key, "a source that a figure uses", "no figure uses the source "+key,
			"sources", key)
	}
}

// source resolves a key; every figure must have one (rule R13). A grade C
// source makes a figure unverified whatever the file says.
func (r *reader) source(key string, path ...any) Source {
	s, ok := r.sources[key]
	if !ok {
		r.fault(refusal.ValueUnknown, key, "a key of [sources] in this file",
			"a figure has no source that is listed (rule R13)", path...)
		return Source{Key: key}
	}
	r.used[key] = true
	return s
}

// note reads a sentence; nil stays nil.
func (r *reader) note(t *textRecord, path ...any) *Note {
	if t == nil {
		return nil
	}
	if t.Text == "" {
		r.fault(refusal.KeyMissing, "", "a sentence", "the text is empty", path...)
	}
	s := r.source(t.Source, path...)
	return &Note{Text: t.Text, Source: s, Unverified: t.Unverified || s.Grade == "C", Pos: r.places.Of(path...)}
}

// figure reads one figure with parse; a nil record is a figure not given.
func figure[T any](r *reader, rec *figureRecord, parse func(string) (T, error), path ...any) Figure[T] {
	if rec == nil {
		return Figure[T]{}
	}
	v, err := parse(rec.Value)
	if err != nil {
		r.badText(rec.Value, err, path...)
	}
	s := r.source(rec.Source, path...)
	if rec.Jurisdiction != "" && !jurisdictionPattern.MatchString(rec.Jurisdiction) {
		r.fault(refusal.ValueUnknown, rec.Jurisdiction, `two capital letters such as "UK", or "international"`,
			"the jurisdiction of the figure is not one", path...)
	}
	if rec.Unverified && rec.VerifiedBy != "" {
		r.fault(refusal.KeyConflict, "unverified, and verified by "+rec.VerifiedBy, "one of the two",
			"the figure is said to be verified and not to be", path...)
	}
	return Figure[T]{
		Value: v, Text: rec.Value, Source: s, Jurisdiction: cmp.Or(rec.Jurisdiction, s.Jurisdiction),
		Unverified: rec.VerifiedBy == "" && (rec.Unverified || s.Grade == "C"), VerifiedBy: rec.VerifiedBy,
		Reason: rec.Reason, Pos: r.places.Of(path...),
	}
}

// badText records an error of a quantity with the code that fits it.
func (r *reader) badText(got string, err error, path ...any) {
	var s *quantity.SyntaxError
	if errors.As(err, &s) {
		r.fault(refusal.Code(s.Code), got, s.Want, err.Error(), path...)
		return
	}
	var k *quantity.KindError
	if errors.As(err, &k) {
		r.fault(refusal.AmountKindDiffer, got, "a quantity counted by "+k.Want.String(), err.Error(), path...)
		return
	}
	r.fault(refusal.ValueUnknown, got, "a value that reads", err.Error(), path...)
}
