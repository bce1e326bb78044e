package sheets

import (
	"fmt"
	"slices"
	"strings"

	"drawup/dilution/formulary"
	"drawup/dilution/quantity/lint"
	"drawup/labels"
)

// PaperFormulary is the formulary on paper, for two people to sign.
const PaperFormulary = "formulary"

// A Book is a formulary on paper: pages in front that say which page each drug
// begins on, then one sheet for each drug, then what is said of two drugs at
// once.
type Book struct {
	Front func(pageOf map[string]int) Sheet // by bookmark
	Drugs []Sheet
}

// FormularyBook is all of f, each figure with its source and a box to tick.
// Printed is the day as it is printed.
func FormularyBook(f *formulary.Formulary, printed string) Book {
	foot := Foot{Made: printed, Formulary: f.Name + " " + f.Version, FormularyDigest: f.Digest[:12], State: f.State(), Digest: f.Digest}
	var book Book
	for _, d := range f.Drugs() {
		book.Drugs = append(book.Drugs, drugSheet(d, foot))
	}
	if pairs := pairSheet(f, foot); len(pairs.Parts) > 0 {
		book.Drugs = append(book.Drugs, pairs)
	}
	book.Front = func(pageOf map[string]int) Sheet { return frontSheet(f, foot, book.Drugs, pageOf) }
	return book
}

// frontSheet says what this is, who signs, and where each drug stands.
func frontSheet(f *formulary.Formulary, foot Foot, drugs []Sheet, pageOf map[string]int) Sheet {
	s := Sheet{Paper: PaperFormulary, Size: A4, Title: capitalised(f.Name) + ", version " + f.Version, Bookmark: "Index", Foot: foot}
	about := []Block{
		Pairs{List: []Pair{words("state", f.State()), words("digest", f.Digest), words("built on", or(f.Base, "nothing: it stands alone")),
			words("drugs", fmt.Sprint(len(f.Drugs())))}},
		Words{Line: labels.Words("Hold each figure against its source and tick it. What is marked unverified nobody has held against a source. " +
			"A figure that is blank is refused when it is needed. " + Advice)},
		Words{Line: labels.Words(grades), Small: true},
		Sign{Roles: []string{"checked by, role, date", "approved by, role, date"}},
	}
	s.Parts = append(s.Parts, Part{Blocks: about}, Part{Blocks: []Block{heading("Index")}})
	const rows = 36
	for from := 0; from < len(drugs); from += 2 * rows {
		half, to := min(from+rows, len(drugs)), min(from+2*rows, len(drugs))
		s.Parts = append(s.Parts, Part{Blocks: []Block{Beside{LeftShare: 50,
			Left: []Block{indexTable(drugs[from:half], pageOf)}, Right: []Block{indexTable(drugs[half:to], pageOf)}}}})
	}
	return s
}

func indexTable(drugs []Sheet, pageOf map[string]int) Table {
	t := Table{Columns: []Column{{Head: "drug", Share: 60}, {Head: "page", Share: 14}}, Small: true}
	for _, d := range drugs {
		t.Rows = append(t.Rows, Row{Cells: []labels.Line{labels.Words(d.Bookmark), labels.Words(fmt.Sprint(pageOf[d.Bookmark]))}})
	}
	return t
}

func or(text, other string) string {
	if text == "" {
		return other
	}
	return text
}

func capitalised(s string) string { return labels.Capital(s) }

// drugSheet is one drug: every entry of its record, group by group.
func drugSheet(d formulary.Drug, foot Foot) Sheet {
	class, _ := labels.ClassOf(d.Class)
	s := Sheet{Paper: PaperFormulary, Size: A4, Title: capitalised(d.Name), Note: strings.ToLower(class.Word), Of: d.From, Bookmark: d.Name, Foot: foot}
	var sources sourceList
	s.Parts = append(s.Parts, entryParts(d.Entries(), &sources)...)
	s.Parts = append(s.Parts, sources.graded(), Part{Blocks: []Block{
		Sign{Roles: []string{d.Name + " checked by, date", "approved by, date"}}}})
	s.Parts = slices.DeleteFunc(s.Parts, func(p Part) bool { return len(p.Blocks) == 0 })
	return s
}

// pairSheet is what the formulary says of two drugs in one syringe.
func pairSheet(f *formulary.Formulary, foot Foot) Sheet {
	s := Sheet{Paper: PaperFormulary, Size: A4, Title: "Two drugs in one syringe", Bookmark: "two drugs in one syringe", Foot: foot}
	var sources sourceList
	s.Parts = entryParts(f.PairEntries(), &sources)
	if len(s.Parts) == 0 {
		return s
	}
	s.Parts = append([]Part{{Blocks: []Block{Words{Line: labels.Words("What stands here may share a syringe, or never may. All other pairs are refused.")}}}}, s.Parts...)
	s.Parts = append(s.Parts, sources.graded(), Part{Blocks: []Block{Sign{Roles: []string{"checked by, date", "approved by, date"}}}})
	return s
}

// entryParts is one part for each group of entries: what stands before the
// first colon of a name is the group. Thousands are grouped, by a comma, as the
// formulary has no house style; all else stands as it is filed.
func entryParts(list []formulary.Entry, sources *sourceList) []Part {
	var parts []Part
	open := "none yet"
	for _, e := range list {
		group, item, ok := strings.Cut(e.Name, ": ")
		if !ok {
			group, item = "", e.Name
		}
		if group != open {
			head := group
			if head == "" {
				head = "record"
			}
			parts = append(parts, Part{Blocks: []Block{heading(lint.UK().Grouped(head)), Table{Box: true, Small: true,
				Columns: []Column{{Head: "what", Share: 62}, {Head: "as filed", Share: 74}, {Head: "source", Share: 44}}}}})
			open = group
		}
		if item == e.Text {
			item = ""
		}
		last := parts[len(parts)-1].Blocks
		t, _ := last[1].(Table)
		t.Rows = append(t.Rows, Row{Strong: e.Unverified, Cells: []labels.Line{labels.Words(lint.UK().Grouped(item)), labels.Words(lint.UK().Grouped(e.Text)), labels.Words(entrySource(e, sources))}})
		last[1] = t
	}
	return parts
}

// entrySource is the mark of the entry's source, who verified it, and why it is
// looser than the base.
func entrySource(e formulary.Entry, sources *sourceList) string {
	if e.Source.Key == "" {
		return ""
	}
	text := sources.mark(e.Source, e.Unverified)
	if e.Unverified {
		text = strings.Replace(text, "unverified", "UNVERIFIED", 1)
	}
	if e.VerifiedBy != "" {
		text += ", verified by " + e.VerifiedBy
	}
	if e.Reason != "" {
		text += ", looser because: " + e.Reason
	}
	return text
}

// graded is the list of sources with grade and jurisdiction.
func (l *sourceList) graded() Part {
	if len(l.list) == 0 {
		return Part{}
	}
	t := Table{Small: true, Columns: []Column{{Head: "source", Share: 20}, {Head: "title", Share: 126}, {Head: "grade", Share: 14}, {Head: "holds in", Share: 20}}}
	for i, s := range l.list {
		t.Rows = append(t.Rows, Row{Cells: []labels.Line{labels.Words(fmt.Sprintf("source %d", i+1)), labels.Words(s.Title), labels.Words(s.Grade), labels.Words(s.Jurisdiction)}})
	}
	return Part{Blocks: []Block{heading("Sources"), t}}
}
