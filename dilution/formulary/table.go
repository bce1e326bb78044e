package formulary

import (
	"bytes"
	"encoding/csv"
	"errors"
	"fmt"
	"io"
	"slices"
	"strings"

	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// columns of a table of standard preparations, in the order in which it is
// written. It may be read in any order, and without source, source jurisdiction and
// unverified where these are blank throughout. A blank diluent means undiluted, so
// that its column may not be lost.
var columns = []string{
	"drug", "id", "mix", "diluent", "line", "patients", "jurisdiction",
	"source", "title", "grade", "source jurisdiction", "unverified",
}

// WriteStandards writes all standard preparations as a table for a spreadsheet:
// comma-separated, one line each, every field as the formulary has it.
func (f *Formulary) WriteStandards(w io.Writer) error {
	out := csv.NewWriter(w)
	if err := out.Write(columns); err != nil {
		return err
	}
	for _, d := range f.drugs {
		for _, s := range d.Standards {
			unverified := ""
			if s.Unverified {
				unverified = "yes"
			}
			err := out.Write([]string{d.Name, s.ID, s.Mix, s.Diluent, s.Line, s.Patients, s.Jurisdiction,
				s.Source.Key, s.Source.Title, s.Source.Grade, s.Source.Jurisdiction, unverified})
			if err != nil {
				return err
			}
		}
	}
	out.Flush()
	return out.Error()
}

// parted tells tables of standards from formulary files.
func parted(texts []Text) (tomls, tables []Text) {
	for _, t := range texts {
		if strings.HasSuffix(strings.ToLower(t.Name), ".csv") {
			tables = append(tables, t)
		} else {
			tomls = append(tomls, t)
		}
	}
	return tomls, tables
}

// withStandards puts the tables' standard preparations in the place of those
// of the drugs that they name; other drugs keep theirs.
func withStandards(f *Formulary, tables []Text) (*Formulary, refusal.List) {
	if len(tables) == 0 {
		return f, nil
	}
	out := *f
	out.drugs = slices.Clone(f.drugs)
	var all refusal.List
	replaced := map[string]bool{}
	for _, t := range tables {
		rows, faults := readStandards(t, f)
		all = append(all, faults...)
		out.Digest = digestOf(out.Digest, digestOf(string(t.Data), ""))
		for _, r := range rows {
			i := slices.IndexFunc(out.drugs, func(d Drug) bool { return d.Name == r.drug })
			d := &out.drugs[i]
			if !replaced[d.Name] {
				d.Standards, replaced[d.Name] = nil, true
			}
			if slices.ContainsFunc(d.Standards, func(s Standard) bool { return s.ID == r.Standard.ID && s.Line == r.Line }) {
				all = append(all, tableFault(refusal.KeyRepeated, r.Pos, "id", r.ID, "one row for each preparation and line",
					fmt.Sprintf("%s of %s stands twice", r.ID, d.Name)))
			}
			d.Standards = append(d.Standards, r.Standard)
		}
	}
	return &out, all
}

// A tableRow is one standard preparation of a table.
type tableRow struct {
	drug string
	Standard
}

// readStandards reads one table. Spreadsheets write a byte-order mark, in some
// countries semicolons, and lines and columns without anything in them behind the
// table; all are taken.
func readStandards(t Text, f *Formulary) ([]tableRow, refusal.List) {
	data := bytes.TrimPrefix(t.Data, []byte("\xef\xbb\xbf"))
	r := csv.NewReader(bytes.NewReader(data))
	r.Comma = commaOf(data)
	r.FieldsPerRecord = -1
	head, err := r.Read()
	if err != nil {
		return nil, refusal.List{tableFault(refusal.FileSyntax, refusal.Pos{File: t.Name, Line: 1, Column: 1}, "table", "", "a first line with the names of the columns",
			"the table has no first line that can be read")}
	}
	at, faults := columnsOf(t, head)
	if faults.Refused() {
		return nil, faults
	}
	var rows []tableRow
	for {
		cells, err := r.Read()
		if errors.Is(err, io.EOF) {
			return rows, faults
		}
		var bad *csv.ParseError
		if errors.As(err, &bad) {
			return rows, append(faults, tableFault(refusal.FileSyntax, refusal.Pos{File: t.Name, Line: bad.Line, Column: bad.Column}, "table", "",
				"fields parted by commas, in plain quotes where they hold one", "the line cannot be read: "+bad.Err.Error()))
		}
		if err != nil {
			return rows, append(faults, tableFault(refusal.FileUnreadable, refusal.Pos{File: t.Name}, "table", "", "a table", err.Error()))
		}
		if blank(cells) {
			continue
		}
		row, wrong := oneStandard(t, f, at, cells, r)
		faults = append(faults, wrong...)
		if !wrong.Refused() {
			rows = append(rows, row)
		}
	}
}

// commaOf is the mark between fields: the one that the first line has more of.
func commaOf(data []byte) rune {
	head, _, _ := bytes.Cut(data, []byte("\n"))
	if bytes.Count(head, []byte(";")) > bytes.Count(head, []byte(",")) {
		return ';'
	}
	return ','
}

func blank(cells []string) bool {
	return !slices.ContainsFunc(cells, func(c string) bool { return strings.TrimSpace(c) != "" })
}

// columnsOf finds each column; unknown ones and missing ones are refused.
func columnsOf(t Text, head []string) (map[string]int, refusal.List) {
	at := map[string]int{}
	var faults refusal.List
	if len(head) == 1 && strings.Contains(head[0], "\t") {
		return at, refusal.List{tableFault(refusal.FileSyntax, refusal.Pos{File: t.Name, Line: 1, Column: 1}, "table", "tabs", "fields parted by commas or semicolons",
			"the fields are parted by tabs")}
	}
	for i, name := range head {
		name = strings.ToLower(strings.TrimSpace(name))
		if name == "" && blank(head[i:]) {
			break
		}
		pos := refusal.Pos{File: t.Name, Line: 1, Column: i + 1}
		if !slices.Contains(columns, name) {
			faults = append(faults, tableFault(refusal.KeyUnknown, pos, "column", name, strings.Join(columns, ", "), fmt.Sprintf("the column %q is not known", name)))
		}
		if _, twice := at[name]; twice {
			faults = append(faults, tableFault(refusal.KeyRepeated, pos, "column", name, "each column once", fmt.Sprintf("the column %q stands twice", name)))
		}
		at[name] = i
	}
	for _, name := range []string{"drug", "id", "mix", "diluent", "line", "patients", "jurisdiction", "title", "grade"} {
		if _, ok := at[name]; !ok {
			faults = append(faults, tableFault(refusal.KeyMissing, refusal.Pos{File: t.Name, Line: 1, Column: 1}, "column", "", name,
				fmt.Sprintf("the column %q is missing", name)))
		}
	}
	return at, faults
}

// oneStandard reads one line. Column numbers of faults count fields.
func oneStandard(t Text, f *Formulary, at map[string]int, cells []string, r *csv.Reader) (tableRow, refusal.List) {
	var faults refusal.List
	line, _ := r.FieldPos(0)
	cell := func(name string) string {
		if i, ok := at[name]; ok && i < len(cells) {
			return strings.TrimSpace(cells[i])
		}
		return ""
	}
	fault := func(code refusal.Code, name, want, message string) {
		faults = append(faults, tableFault(code, refusal.Pos{File: t.Name, Line: line, Column: at[name] + 1}, name, cell(name), want, message))
	}
	if len(cells) > len(at) && !blank(cells[len(at):]) {
		fault(refusal.FileSyntax, "drug", fmt.Sprintf("%d fields", len(at)), fmt.Sprintf("the line has %d fields, the first has %d", len(cells), len(at)))
	}
	s := Standard{ID: cell("id"), Mix: cell("mix"), Diluent: cell("diluent"), Line: cell("line"), Patients: cell("patients"),
		Jurisdiction: cell("jurisdiction"), Pos: refusal.Pos{File: t.Name, Line: line, Column: 1},
		Source: Source{Key: cell("source"), Title: cell("title"), Grade: cell("grade"), Jurisdiction: cell("source jurisdiction")}}
	d, ok := f.named(cell("drug"))
	if !ok {
		fault(refusal.DrugUnknown, "drug", "the name of a drug as it is filed", fmt.Sprintf("%q is not the name of a drug as it is filed", cell("drug")))
		if known, near, is := f.Find(cell("drug")); is {
			near = []string{known.Name}
			faults[len(faults)-1].Remedy = "write " + near[0]
		} else if len(near) > 0 {
			faults[len(faults)-1].Remedy = "was " + strings.Join(near, " or ") + " meant?"
		}
	}
	var err error
	if s.Amount, s.Volume, err = quantity.ParseMix(s.Mix); err != nil {
		fault(refusal.ValueUnknown, "mix", `a mixture such as "4 mg in 50 mL"`, err.Error())
	} else if ok && s.Amount.Kind() != d.Kind {
		fault(refusal.AmountKindDiffer, "mix", "an amount counted by "+d.Kind.String(), fmt.Sprintf("%s is counted by %s", d.Name, d.Kind))
	}
	if s.ID == "" {
		fault(refusal.KeyMissing, "id", "what an order names", "the preparation has no id")
	}
	if !slices.Contains([]string{"any", "peripheral", "central"}, s.Line) {
		fault(refusal.ValueUnknown, "line", "any, peripheral or central", "the line is not known")
	}
	if !slices.Contains([]string{"", "adults", "children", "newborns"}, s.Patients) {
		fault(refusal.ValueUnknown, "patients", "adults, children, newborns or nothing", fmt.Sprintf("nobody is called %q here", s.Patients))
	}
	for _, name := range []string{"jurisdiction", "source jurisdiction"} {
		if x := cell(name); (x != "" || name == "jurisdiction") && !jurisdictionPattern.MatchString(x) {
			fault(refusal.ValueUnknown, name, `two capital letters such as "UK", or "international"`, fmt.Sprintf("%q is no jurisdiction", x))
		}
	}
	if s.Source.Title == "" || !slices.Contains([]string{"A", "B", "C", "P"}, s.Source.Grade) {
		fault(refusal.KeyMissing, "title", "a source spelled out, with its grade A, B, C or P", "the preparation has no source (rule R13)")
	}
	switch cell("unverified") {
	case "", "no":
		s.Unverified = s.Source.Grade == "C"
	case "yes":
		s.Unverified = true
	default:
		fault(refusal.ValueUnknown, "unverified", "yes, no or nothing", "the word is not known")
	}
	return tableRow{d.Name, s}, faults
}

func tableFault(code refusal.Code, pos refusal.Pos, field, got, want, message string) refusal.Reason {
	return refusal.Reason{Code: code, Severity: refusal.Refuse, Field: field, Got: got, Want: want, Rule: "R10", Pos: pos,
		Message: message, Remedy: "mend the table"}
}
