package sheets

import "drawup/labels"

// An Owned is a line and the syringe that its figures belong to; 0 leaves that
// to the part.
type Owned struct {
	Syringe int
	Line    labels.Line
}

// A Block is one of Heading, Name, Words, Steps, Table, Blank, Pairs, Big,
// Boxes, Ticks, Cautions, Sign, Chart and Beside.
type Block interface {
	// Lines is everything that the block prints, in reading order.
	Lines() []Owned
}

// A Heading opens a section.
type Heading struct{ Line labels.Line }

// A Name is the head of a syringe: its number, the drug, the class word and
// its colour, the concentration, whom it is for.
type Name struct {
	Number        int
	Drug          string // "Etomidate"
	Class         labels.Class
	Concentration labels.Line // nil on a blind page
	Act, Then     labels.Line // on a draw-up sheet: what to draw, large in place of the concentration, and what becomes of it
	Below         labels.Line // presentation, patient
	Large         bool        // on a pump card
}

// Words is a paragraph.
type Words struct {
	Line   labels.Line
	Strong bool
	Small  bool
}

// Steps are acts, one a line, numbered from 1, each with a box to tick.
type Steps struct {
	List   []labels.Line
	Strong []string // names of the figures that are the act itself
	Plain  bool     // nothing to tick
}

// A Column is one column of a table.
type Column struct {
	Head   string
	Share  int  // of the width, in parts of the sum of all shares
	Strong bool // the column to find at once
}

// A Row is one row of a table. Syringe is set where a table holds rows of
// several syringes.
type Row struct {
	Syringe int
	Cells   []labels.Line
	Strong  bool
}

// A Table is rows under a head.
type Table struct {
	Columns []Column
	Rows    []Row
	Box     bool // a box to tick before every row
	Small   bool
}

// A Pair is a word and what it is.
type Pair struct {
	Key   string
	Value labels.Line
}

// Pairs are rows of a word and its value.
type Pairs struct {
	List   []Pair
	Strong []string // names of the figures to find at once
	Dense  bool
	Small  bool // for reference only
}

// A BigRow is a number that has to be found at once.
type BigRow struct {
	Key   string
	Value labels.Line
	Note  labels.Line // small, below
	Most  bool        // the one number of the sheet
}

// Big are such rows.
type Big struct{ List []BigRow }

// A Box is an empty box to write in.
type Box struct {
	Label string
	Unit  string // printed behind the box
	Wide  bool   // takes the whole width
}

// Boxes are boxes to fill in, two beside each other.
type Boxes struct{ List []Box }

// Ticks are sentences with a box to tick.
type Ticks struct{ List []string }

// A Caution is a sentence with its code in small type and its source. Syringe
// is set where the sentences belong to several syringes.
type Caution struct {
	Text    labels.Line
	Code    string      // "dose-above-usual"
	Note    labels.Line // source, "unverified"
	Syringe int
}

// Cautions are sentences that must be read, the gravest first. Where Rest is
// set and the page has no room for all of them, the last ones may be left out,
// and Rest, which says where they stand, is printed in their place.
type Cautions struct {
	List []Caution
	Rest string
}

// Sign is a row of places to sign, each for one person.
type Sign struct{ Roles []string }

// A Point is a place on the line of a chart. At is the share of the way from
// nought to the top in 10,000 parts, the same on both axes.
type Point struct {
	At         int
	Dose, Rate labels.Line // at the two axes
	Start      bool
}

// A Chart is dose rate, upwards, against pump rate: one straight line through
// nought, thick within the range from Low to High. Points stand in order of
// weight: where two would print over each other, the later one is left out.
type Chart struct {
	Points       []Point
	Low, High    int
	XWord, YWord string
}

// A Blank is a table to fill in by hand: heads and empty rows.
type Blank struct {
	Columns []Column
	Rows    int
}

// A Beside is two runs of blocks next to each other. LeftShare is the left
// one's part of the width in per cent.
type Beside struct {
	LeftShare   int
	Left, Right []Block
}

// Lines is the heading.
func (b Heading) Lines() []Owned { return own(b.Line) }

// Lines is the name, what to do, concentration, class word and the line below.
func (b Name) Lines() []Owned {
	return own(labels.Words(b.Drug), b.Act, b.Concentration, b.Then, labels.Words(b.Class.Word), b.Below)
}

// Lines is the paragraph.
func (b Words) Lines() []Owned { return own(b.Line) }

// Lines is the steps.
func (b Steps) Lines() []Owned { return own(b.List...) }

// Lines is the heads and then all cells, row by row.
func (b Table) Lines() []Owned {
	var out []Owned
	for _, c := range b.Columns {
		out = append(out, Owned{Line: labels.Words(c.Head)})
	}
	for _, r := range b.Rows {
		for _, c := range r.Cells {
			out = append(out, Owned{r.Syringe, c})
		}
	}
	return out
}

// Lines is each word and its value.
func (b Pairs) Lines() []Owned {
	var out []Owned
	for _, p := range b.List {
		out = append(out, own(labels.Words(p.Key), p.Value)...)
	}
	return out
}

// Lines is each word, its number and its note.
func (b Big) Lines() []Owned {
	var out []Owned
	for _, r := range b.List {
		out = append(out, own(labels.Words(r.Key), r.Value, r.Note)...)
	}
	return out
}

// Lines is the words at the boxes.
func (b Boxes) Lines() []Owned {
	var out []Owned
	for _, x := range b.List {
		out = append(out, own(labels.Words(x.Label), labels.Words(x.Unit))...)
	}
	return out
}

// Lines is the sentences.
func (b Ticks) Lines() []Owned {
	var out []Owned
	for _, t := range b.List {
		out = append(out, own(labels.Words(t))...)
	}
	return out
}

// Lines is each sentence, its note and its code.
func (b Cautions) Lines() []Owned {
	var out []Owned
	for _, c := range b.List {
		out = append(out, Owned{c.Syringe, c.Text}, Owned{c.Syringe, c.Note}, Owned{Line: labels.Words(c.Code)})
	}
	return out
}

// Lines is who signs.
func (b Sign) Lines() []Owned {
	var out []Owned
	for _, r := range b.Roles {
		out = append(out, own(labels.Words(r))...)
	}
	return out
}

// Lines is the words and figures at the axes.
func (b Chart) Lines() []Owned {
	out := own(labels.Words(b.XWord), labels.Words(b.YWord))
	for _, p := range b.Points {
		out = append(out, own(p.Dose, p.Rate)...)
	}
	return out
}

// Lines is the heads.
func (b Blank) Lines() []Owned {
	var out []Owned
	for _, c := range b.Columns {
		out = append(out, Owned{Line: labels.Words(c.Head)})
	}
	return out
}

// Lines is the left blocks, then the right ones.
func (b Beside) Lines() []Owned {
	var out []Owned
	for _, side := range [][]Block{b.Left, b.Right} {
		for _, x := range side {
			out = append(out, x.Lines()...)
		}
	}
	return out
}

func own(lines ...labels.Line) []Owned {
	out := make([]Owned, 0, len(lines))
	for _, l := range lines {
		out = append(out, Owned{Line: l})
	}
	return out
}

func heading(text string) Heading { return Heading{labels.Words(text)} }

func words(key, value string) Pair { return pair(key, labels.Words(value)) }

func pair(key string, value labels.Line) Pair { return Pair{key, value} }
