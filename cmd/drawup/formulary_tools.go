package main

import (
	"bytes"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"time"

	"drawup/dilution/formulary"
	"drawup/dilution/formulary/verify"
	"drawup/dilution/refusal"
	"drawup/dilution/tomlfile"
)

// A verifyDocument is the answer of formulary verify.
type verifyDocument struct {
	Formulary *formularyHead `json:"formulary,omitempty"`
	Drugs     int            `json:"drugs_checked"`
	findings
}

// runFormularyVerify holds a formulary against itself: the starter, a site's
// files over it, or files that stand alone. All findings are told at once.
func runFormularyVerify(e env, r *formularyRequest) int {
	doc := &verifyDocument{}
	f, faults := openFormulary(r.words)
	if f != nil && !faults.Refused() && len(f.Drugs())+len(f.PairEntries())+len(f.TallMan) == 0 {
		faults = append(faults, refusal.Reason{Code: refusal.KeyMissing, Severity: refusal.Refuse, Field: "drug", Got: "none", Want: "a drug, a pair or a list of names",
			Message: f.Name + " holds no drug, no pair and no list of names", Remedy: "check that this is the whole file; drawup formulary schema shows what one holds"})
	}
	if f != nil {
		doc.Formulary, doc.Drugs = headOf(f), len(f.Drugs())
		faults = append(faults, verify.Check(f)...)
	}
	faults.Sort()
	return finish(e, r.json, doc, func(w io.Writer) {
		fmt.Fprintf(w, "%s, version %s, digest %s\n%d drugs checked: no findings.\n", f.Name, f.Version, f.Digest, len(f.Drugs()))
		fmt.Fprintln(w, "A file without findings can still be wrong: each figure has to be held against its source.")
	}, faults)
}

// openFormulary is the formulary that a list of files names; no files, or the
// word starter, name the embedded one. A folder stands for all formulary files
// and tables in it.
func openFormulary(names []string) (*formulary.Formulary, refusal.List) {
	starter, err := formulary.Default()
	if err != nil {
		return nil, refusal.List{ourFault(0, err)}
	}
	var files []string
	for _, n := range names {
		if n == "starter" {
			continue
		}
		if info, err := os.Stat(n); err == nil && info.IsDir() {
			inside, faults := filesIn(n)
			if faults.Refused() {
				return nil, faults
			}
			files = append(files, inside...)
			continue
		}
		files = append(files, n)
	}
	if len(files) == 0 {
		return starter, nil
	}
	texts, faults := textsOf(files)
	if faults.Refused() {
		return nil, faults
	}
	return formulary.Layer(starter, texts...)
}

// filesIn is the formulary files and tables of a folder; one without any is a slip,
// and must not stand for the starter.
func filesIn(dir string) ([]string, refusal.List) {
	var files []string
	for _, pattern := range []string{"*.toml", "*.csv"} {
		found, err := filepath.Glob(filepath.Join(escapeGlob(dir), pattern))
		if err != nil {
			return nil, refusal.List{ourFault(0, err)}
		}
		files = append(files, found...)
	}
	if len(files) == 0 {
		return nil, refusal.List{{Code: refusal.FileUnreadable, Severity: refusal.Refuse, Field: "file", Got: dir, Want: "a folder with formulary files (.toml) or tables (.csv)",
			Message: fmt.Sprintf("the folder %q holds no formulary file and no table", dir), Remedy: "check the name; the starter needs none, or the word starter"}}
	}
	return files, nil
}

// A compareDocument is the answer of formulary compare.
type compareDocument struct {
	Older   *formularyHead `json:"older,omitempty"`
	Newer   *formularyHead `json:"newer,omitempty"`
	Changes []changeJSON   `json:"changes"`
	findings
}

type changeJSON struct {
	Drug     string `json:"drug,omitempty"`
	Entry    string `json:"entry"`
	Old      string `json:"old,omitempty"`
	New      string `json:"new,omitempty"`
	Verb     string `json:"verb"`
	Loosened bool   `json:"loosened"`
	Reason   string `json:"reason,omitempty"`
	Source   string `json:"source,omitempty"`
}

// runFormularyCompare tells what changed, what was loosened first. A difference
// is no refusal: the exit code says whether both could be read.
func runFormularyCompare(e env, r *formularyRequest) int {
	doc := &compareDocument{Changes: []changeJSON{}}
	older, faults := openFormulary(r.words[:1])
	newer, more := openFormulary(r.words[1:])
	// What a site loosens without a reason is told as a change, not refused.
	faults = without(append(faults, more...), refusal.LimitLoosened)
	if faults.Refused() {
		return finish(e, r.json, doc, nil, faults)
	}
	doc.Older, doc.Newer = headOf(older), headOf(newer)
	changes := formulary.Compare(older, newer)
	for _, c := range changes {
		doc.Changes = append(doc.Changes, changeJSON{c.Drug, c.Name, c.Old, c.New, c.Verb, c.Loosened, c.Reason, c.Source.Title})
	}
	return finish(e, r.json, doc, func(w io.Writer) { tellChanges(w, doc, changes) }, nil)
}

func tellChanges(w io.Writer, doc *compareDocument, changes []formulary.Change) {
	fmt.Fprintf(w, "older: %s, version %s, digest %s\nnewer: %s, version %s, digest %s\n",
		doc.Older.Name, doc.Older.Version, doc.Older.Digest[:12], doc.Newer.Name, doc.Newer.Version, doc.Newer.Digest[:12])
	if len(changes) == 0 {
		fmt.Fprintln(w, "\nno drug says anything else")
		return
	}
	part := func(title string, loosened bool) {
		n := 0
		for _, c := range changes {
			if c.Loosened != loosened {
				continue
			}
			if n == 0 {
				fmt.Fprintf(w, "\n%s\n", title)
			}
			n++
			for i, l := range wrap(c.String(), widest-4) {
				lead := "  - "
				if i > 0 {
					lead = "    "
				}
				fmt.Fprintln(w, lead+l)
			}
			for _, x := range []string{tailed("reason: ", c.Reason), tailed("source: ", c.Source.Title)} {
				for _, l := range wrap(x, widest-8) {
					fmt.Fprintln(w, "        "+l)
				}
			}
		}
	}
	part("loosened: lets through what the older one does not", true)
	part("all other changes", false)
}

// tailed is text behind its lead, "" when there is none.
func tailed(lead, text string) string {
	if text == "" {
		return ""
	}
	return lead + text
}

// runFormularyStandards writes the standard preparations as a table for a
// spreadsheet. The table is read back with --formulary FILE.csv.
func runFormularyStandards(e env, r *formularyRequest) int {
	f, faults := r.open(e)
	if faults.Refused() {
		return finish(e, r.json, &bareDocument{}, nil, faults)
	}
	var b bytes.Buffer
	if err := f.WriteStandards(&b); err != nil {
		return finish(e, r.json, &bareDocument{}, nil, refusal.List{ourFault(0, err)})
	}
	return r.deliver(e, b.Bytes(), "the table of standard preparations")
}

// inputs is every file that was read.
func (r *formularyRequest) inputs() []string {
	return named(append(slices.Clone(r.own.files), r.own.approval))
}

// deliver writes data to --out, or to standard output.
func (r *formularyRequest) deliver(e env, data []byte, what string) int {
	if !r.out.given {
		if _, err := e.stdout.Write(data); err != nil {
			return outputFault(e, err)
		}
		return exitMade
	}
	if faults := writeAll([]file{{r.out.text, data}}, r.inputs()); faults.Refused() {
		return finish(e, r.json, &bareDocument{}, nil, faults)
	}
	return finish(e, r.json, &bareDocument{}, func(w io.Writer) { fmt.Fprintf(w, "%s: %s\n", what, r.out.text) }, nil)
}

// runFormularyApproval writes an approval file for two people to keep. It
// signs for nobody: the names are those that were typed.
func runFormularyApproval(e env, r *formularyRequest) int {
	f, faults := r.open(e)
	day, late := r.day(e)
	faults = append(faults, late...)
	if len(r.signers) != 2 {
		faults = append(faults, refusal.Reason{Code: refusal.FlagMissing, Severity: refusal.Refuse, Field: "--signed", Got: strings.Join(r.signers, "; "),
			Want: "two people", Rule: "R13", Message: "an approval has two people, and --signed names one each",
			Remedy: `add --signed "A. Example, pharmacist" --signed "B. Example, anaesthetist"`})
	}
	if !r.review.given {
		faults = append(faults, refusal.Reason{Code: refusal.FlagMissing, Severity: refusal.Refuse, Field: "--review", Want: "the last day on which it holds",
			Rule: "R13", Message: "an approval ends: --review names its last day", Remedy: `add --review "2027-12-01"`})
	}
	if faults.Refused() {
		return finish(e, r.json, &bareDocument{}, nil, faults)
	}
	text := approvalText(f, day, r.review.text, r.signers)
	a, faults := formulary.ReadApproval(formulary.Text{Name: "the approval", Data: []byte(text)})
	if !faults.Refused() {
		_, faults = f.Approve(a, day)
	}
	if faults.Refused() {
		return finish(e, r.json, &bareDocument{}, nil, faults)
	}
	return r.deliver(e, []byte(text), "the approval")
}

func approvalText(f *formulary.Formulary, day time.Time, review string, signers []string) string {
	var b strings.Builder
	q := tomlfile.Quote
	fmt.Fprintf(&b, "# Approval of a formulary. It holds for this digest alone: whoever changes a\n# figure has it approved again.\n")
	fmt.Fprintf(&b, "formulary = %s\nversion = %s\ndigest = %s\ndate = %s\nreview = %s\n", q(f.Name), q(f.Version), q(f.Digest), q(day.Format("2006-01-02")), q(review))
	fmt.Fprintf(&b, "otherwise = \"refuse\" # or \"not approved\": print that line instead\n")
	for _, s := range signers {
		name, role, _ := strings.Cut(s, ",")
		fmt.Fprintf(&b, "\n[[signer]]\nname = %s\nrole = %s\n", q(strings.TrimSpace(name)), q(strings.TrimSpace(role)))
	}
	return b.String()
}
