package recheck

import (
	"fmt"
	"slices"
	"strings"
)

// A Passed is the proof that a set of figures went through Check. The zero
// Passed proves nothing.
type Passed struct {
	figures map[Figure]bool
}

// Covers says whether every one of the figures (Paper, Name and Text) was in
// the set that passed. The zero Passed covers nothing, not even an empty list.
func (p Passed) Covers(figures []Figure) bool {
	if p.figures == nil {
		return false
	}
	for _, f := range figures {
		if !p.figures[f] {
			return false
		}
	}
	return true
}

// Check works every printed figure again and compares (rules R1 to R6, R9,
// R17, R18). It looks at all of them; its error is a *Disagreement that lists
// every fault. A figure that no sum, no typed text and no line of the record
// can confirm is a fault as well.
func Check(s Stated) (Passed, error) {
	c := newCheck(s)
	if len(s.Figures) == 0 {
		c.add("", "", "", "", "no figure is stated, so nothing was checked")
	}
	c.checkAsked()
	for _, name := range c.names {
		c.checkOne(name)
	}
	if len(c.faults) > 0 {
		return Passed{}, &Disagreement{Faults: c.faults}
	}
	passed := Passed{figures: make(map[Figure]bool, len(s.Figures))}
	for _, f := range s.Figures {
		passed.figures[f] = true
	}
	return passed, nil
}

// A check is the work on one Stated.
type check struct {
	syringe string
	drug    string
	names   []string            // in the order in which they were first stated
	texts   map[string]string   // name to printed text
	papers  map[string][]string // name to the papers it stands on
	asked   map[string][]string // name to typed texts
	slips   map[string]int      // kind of slip to how many rows name it
	read    map[string]value    // name to exact value, filled as figures are needed
	parsed  map[string]parsed   // printed text to its reading
	record  record
	packs   []int      // rows of the sizes of container, sorted
	all     *known     // what a sentence may repeat, filled when one is met
	own     *known     // what a bound may repeat
	block   *blockText // texts of the drug's block
	faults  []Fault

	twoSteps  bool // a figure of an intermediate syringe is printed
	twoDrugs  bool // there is a second drug from a container of its own
	otherName string
	other     record
	mix       []string // texts of what the record says of the pair
}

func newCheck(s Stated) *check {
	c := &check{
		syringe: s.Syringe,
		drug:    s.Drug,
		texts:   map[string]string{},
		papers:  map[string][]string{},
		asked:   map[string][]string{},
		slips:   map[string]int{},
		read:    map[string]value{},
		parsed:  map[string]parsed{},
		record:  findRecord(s.Record, s.Drug, s.Presentation),
	}
	for _, f := range s.Figures {
		first, known := c.texts[f.Name]
		switch {
		case !known:
			c.names = append(c.names, f.Name)
			c.texts[f.Name] = f.Text
			c.note(f)
		case first != f.Text:
			c.add(f.Paper, f.Name, f.Text, first, "the papers do not say the same: "+strings.Join(c.papers[f.Name], ", ")+" prints the other text")
		}
		if !slices.Contains(c.papers[f.Name], f.Paper) {
			c.papers[f.Name] = append(c.papers[f.Name], f.Paper)
		}
	}
	for _, f := range s.Asked {
		c.asked[f.Name] = append(c.asked[f.Name], f.Text)
	}
	c.findOther(s)
	slices.Sort(c.packs)
	c.packs = slices.Compact(c.packs)
	return c
}

// findOther looks up the second drug and what is said of the pair.
func (c *check) findOther(s Stated) {
	c.twoDrugs = c.twoDrugs || s.OtherDrug != "" || c.was(OtherDrug)
	if c.otherName = s.OtherDrug; c.otherName == "" {
		c.other.problem = "no second drug is stated whose record could be searched"
		return
	}
	c.other = findRecord(s.OtherRecord, s.OtherDrug, s.OtherPresentation)
	c.mix = pairTexts([][]byte{s.Record, s.OtherRecord, s.PairRecord}, s.Drug, s.OtherDrug)
}

// note keeps what the names alone tell of the syringe.
func (c *check) note(f Figure) {
	key, row := splitRow(f.Name)
	switch {
	case key == Slip+".*.kind":
		c.slips[f.Text]++
	case row > 0 && strings.HasPrefix(key, Pack+"."):
		c.packs = append(c.packs, row)
	case strings.HasPrefix(key, "intermediate."):
		c.twoSteps = true
	case strings.HasPrefix(key, "other."):
		c.twoDrugs = true
	}
}

func (c *check) add(paper, name, printed, gets, sentence string) {
	c.faults = append(c.faults, Fault{Syringe: c.syringe, Paper: paper, Name: name, Printed: printed, Gets: gets, Sentence: sentence})
}

func (c *check) checkOne(name string) {
	text := c.texts[name]
	papers := strings.Join(c.papers[name], ", ")
	key, row := splitRow(name)
	work, ok := rules[key]
	if !ok {
		c.add(papers, name, text, "", "the second route has no sum for a figure of this name")
		return
	}
	o := work(c, row, text)
	if o == nil {
		o = c.honoured(name, text)
	}
	if o != nil {
		c.add(papers, name, text, o.gets, o.why)
	}
}

// honoured holds a figure against what was typed under its own name, so that
// nothing typed is passed over. Names whose rule has already weighed the typed
// text in its own way are left out.
func (c *check) honoured(name, text string) *objection {
	if !c.was(name) || isStocked(name) {
		return nil
	}
	switch name {
	case AmountInSyringe, Concentration, ContainerCount, DoseCount, Age, Sex, Prepared, UseHours, IntermediateUseHours, WantedTime, Ref,
		OtherDrug, OtherAmount, OtherContainerCount:
		return nil
	case SecondAmount, SecondConcentrated:
		if c.twoDrugs { // what was wanted of the second drug, before its volume was rounded
			return nil
		}
	case UseBy, IntermediateUseBy, EmptyAt:
		return sameMoment(c.asked[name][0], text)
	}
	if key, _ := splitRow(name); key == Said+".*.text" || key == Bound+".*.text" {
		return nil // asGiven compares these letter for letter
	}
	r, err := c.parse(text)
	if err != nil {
		return c.sameText(name, text)
	}
	return exact(r, c.typed(name), "typed as")
}

// checkAsked refuses what was asked twice in different words, and what the
// second route does not know: it could not tell whether it was honoured.
func (c *check) checkAsked() {
	names := make([]string, 0, len(c.asked))
	for name := range c.asked {
		names = append(names, name)
	}
	slices.Sort(names)
	for _, name := range names {
		typed := c.asked[name]
		key, _ := splitRow(name)
		if _, ok := rules[key]; !ok {
			c.add("the order", name, typed[0], "", "the second route does not know what was asked under this name")
		}
		for _, other := range typed[1:] {
			if other != typed[0] && !isStocked(name) {
				c.add("the order", name, other, typed[0], "was asked twice in different words")
			}
		}
	}
}

// isStocked says whether several typed texts of one name are a list to choose
// from: what the site has in stock.
func isStocked(name string) bool {
	switch name {
	case DrugStep, DoseStep, DrugBarrel, FinalBarrel, Typed,
		IntermediateDrugStep, IntermediateDrugBarrel, IntermediateStep, IntermediateBarrel, TakenStep, TakenBarrel, OtherStep, OtherBarrel:
		return true
	}
	return false
}

// A parsed is a printed text as read, or why it cannot be.
type parsed struct {
	reading reading
	err     error
}

// parse reads each printed text once.
func (c *check) parse(text string) (reading, error) {
	p, ok := c.parsed[text]
	if !ok {
		p.reading, p.err = readPrinted(text)
		c.parsed[text] = p
	}
	return p.reading, p.err
}

// get is the exact value of a printed figure, or what is lacking. No sum
// changes the whole numbers of a value, so one reading serves them all.
func (c *check) get(name string) value {
	if v, ok := c.read[name]; ok {
		return v
	}
	v := c.readOnce(name)
	c.read[name] = v
	return v
}

// once keeps a worked value under a key that no figure can have.
func (c *check) once(key string, work func() value) value {
	if v, ok := c.read["="+key]; ok {
		return v
	}
	v := work()
	c.read["="+key] = v
	return v
}

func (c *check) readOnce(name string) value {
	text, ok := c.texts[name]
	if !ok {
		return lacking("needs " + name + ", which is not printed")
	}
	r, err := c.parse(text)
	if err != nil {
		return lacking("needs " + name + ", which cannot be read")
	}
	return r.whole
}

func (c *check) has(name string) bool {
	_, ok := c.texts[name]
	return ok
}

func (c *check) was(name string) bool { return len(c.asked[name]) > 0 }

// typed is the one typed value of a name.
func (c *check) typed(name string) value {
	texts := c.asked[name]
	if len(texts) == 0 {
		return lacking("needs " + name + " as typed, which is not among what was asked")
	}
	if name == Concentration {
		if v, ok := readOldStrength(texts[0]); ok {
			return v
		}
	}
	v, _, err := readTyped(texts[0])
	if err != nil {
		return lacking(fmt.Sprintf("%s as typed, %q: %v", name, texts[0], err))
	}
	return v
}

// A rule confirms one printed figure or objects. Row is the number of a table
// row, zero elsewhere.
type rule func(c *check, row int, text string) *objection

// measured makes a rule that first reads the text as number and unit.
func measured(work func(c *check, row int, r reading) *objection) rule {
	return func(c *check, row int, text string) *objection {
		r, err := c.parse(text)
		if err != nil {
			return object("", "cannot be read: "+err.Error())
		}
		return work(c, row, r)
	}
}

// asTyped is the rule of figures that only repeat what was typed.
func asTyped(name string) rule {
	return measured(func(c *check, _ int, r reading) *objection {
		return exact(r, c.typed(name), "typed as")
	})
}

// stocked is the rule of a figure that must be one of the typed ones.
func stocked(name string) rule {
	return measured(func(c *check, _ int, r reading) *objection {
		return c.oneOf(name, r)
	})
}

func (c *check) oneOf(name string, r reading) *objection {
	stock := c.stockOf(name)
	if len(stock) == 0 {
		return object("", "is not among what was typed for "+name+", and no sum could confirm it")
	}
	for _, text := range stock {
		v, _, err := readTyped(text)
		if err == nil && exact(r, v, "typed as") == nil {
			return nil
		}
	}
	return object(strings.Join(stock, " or "), "is none of those typed")
}

// sameText is the rule of words that must be repeated letter by letter.
func (c *check) sameText(name, text string) *objection {
	if !c.was(name) {
		return object("", "is not among what was typed, and no sum could confirm it")
	}
	if c.asked[name][0] != text {
		return object(c.asked[name][0], "was typed so")
	}
	return nil
}
