package recheck

import (
	"regexp"
	"slices"
	"strconv"
	"strings"
	"unicode"
)

// This file holds the figures of sentences against what else is known of the
// syringe. It does not understand the words between them.

// mostSentence bounds the texts that are cut into figures, in bytes. A longer
// one is neither confirmed nor confirms anything.
const mostSentence = 4 << 10

// A known is everything that a sentence may repeat.
type known struct {
	quantities []value
	plain      []value
	moments    []token
	words      map[string]bool
	// printed confirms a quantity that is allowed by a rule of its own.
	printed func(reading) bool
	// syringe holds the numbers of the syringe's own name.
	syringe []value
}

func (k *known) has(list []value, v value) bool {
	return slices.ContainsFunc(list, func(w value) bool { return sameValue(v, w) })
}

// learn takes every figure out of a text, and the text as a whole where it is
// one quantity typed in a way that no sentence shows.
func (k *known) learn(text string) {
	if len(text) > mostSentence || !strings.ContainsFunc(text, unicode.IsNumber) {
		return
	}
	if v, _, err := readTyped(text); err == nil {
		k.quantities = append(k.quantities, v)
		if fields := strings.Split(fold(text), " "); len(fields) == 2 { // parted as tokens are
			k.words[fields[0]] = true
			return
		}
	}
	for _, t := range tokens(text) {
		k.words[t.word] = true
		switch t.kind {
		case withUnit:
			k.quantities = append(k.quantities, t.number.times(t.unit))
		case withoutUnit:
			k.plain = append(k.plain, t.number)
		case dateOrTime:
			k.moments = append(k.moments, t)
		case wordWithDigits:
		}
	}
}

// allKnown is what a sentence may repeat: the other figures, what was asked,
// and the drug's block of the record.
func (c *check) allKnown() *known {
	if c.all != nil {
		return c.all
	}
	k := &known{words: map[string]bool{}}
	for _, name := range c.names {
		switch key, _ := splitRow(name); key {
		case Said + ".*.text", Bound + ".*.text", Code + ".*.text", Ref, Slip + ".*.rate":
			// A slip's rate is wrong by design; no sentence may take it.
		default:
			c.learnFigure(k, c.texts[name])
		}
	}
	for name, texts := range c.asked {
		switch key, _ := splitRow(name); key {
		case Said + ".*.text", Bound + ".*.text":
			continue // what a sentence was to say confirms no figure in it
		case Ref, FormularyDigest, ProductNumber, ProductConcentration, ProductVolume:
			continue // these are for the barcode alone
		}
		for _, text := range texts {
			k.learn(text)
			if v, ok := readOldStrength(text); ok && name == Concentration {
				k.quantities = append(k.quantities, v)
			}
		}
	}
	for _, text := range c.blockTexts().texts {
		k.learn(text)
	}
	for _, t := range tokens(c.syringe) {
		if t.kind == withoutUnit {
			k.syringe = append(k.syringe, t.number)
		}
	}
	k.printed = c.isTolerance
	c.all = k
	return k
}

// isTolerance says whether a quantity is the reading tolerance of a volume that
// is drawn, in the barrel that measures it.
func (c *check) isTolerance(r reading) bool {
	for _, use := range barrelUses() {
		if use.step == "" || !c.has(use.holds) || !c.has(use.barrel) {
			continue
		}
		if short(r, c.toleranceOf(use.holds, use.barrel).times(c.get(use.holds))) == nil {
			return true
		}
	}
	return false
}

// learnFigure takes a figure that is one quantity as it has been read already.
func (c *check) learnFigure(k *known, text string) {
	if r, err := c.parse(text); err == nil {
		k.quantities = append(k.quantities, r.whole)
		return
	}
	k.learn(text)
}

// ownKnown is what a bound may repeat: the drug's block of the record alone.
func (c *check) ownKnown() *known {
	if c.own != nil {
		return c.own
	}
	k := &known{words: map[string]bool{}, printed: func(reading) bool { return false }}
	for _, text := range c.blockTexts().texts {
		k.learn(text)
	}
	c.own = k
	return k
}

// A blockText is the texts of the drug's block of the record: as they are, with
// blanks folded, and the latter without figures. Of two drugs it holds those of
// both and of the pair; the first own of them are the drug's own.
type blockText struct {
	texts, folded, words []string
	own                  int
}

// blockTexts reads the blocks once; it is empty where the record cannot be read,
// so that nothing is confirmed by it.
func (c *check) blockTexts() *blockText {
	if c.block != nil {
		return c.block
	}
	c.block = &blockText{}
	c.block.add(c.record)
	c.block.own = len(c.block.texts)
	c.block.add(c.other)
	c.block.keep(c.mix)
	return c.block
}

func (b *blockText) add(r record) {
	if r.problem != "" {
		return
	}
	if texts, ok := r.place.texts(); ok {
		b.keep(texts)
	}
}

func (b *blockText) keep(texts []string) {
	for _, t := range texts {
		folded := unseparated(fold(t))
		b.texts = append(b.texts, t)
		b.folded = append(b.folded, folded)
		b.words = append(b.words, withoutFigures(folded))
	}
}

func said(c *check, row int, text string) *objection {
	if o := c.asGiven(Row(Said, row, "text"), text); o != nil {
		return o
	}
	folded, o := readable(text)
	if o != nil || c.inBlock(folded) {
		return o
	}
	if o := c.misquoted(unseparated(folded)); o != nil {
		return o
	}
	rest, o := withoutFixed(folded)
	if o != nil {
		return o
	}
	return c.allKnown().confirm(rest, "stands in no other figure, in nothing that was asked and not in the drug's record")
}

func bound(c *check, row int, text string) *objection {
	if o := c.asGiven(Row(Bound, row, "text"), text); o != nil {
		return o
	}
	folded, o := readable(text)
	if o != nil {
		return o
	}
	if c.record.problem != "" {
		return object("", c.record.problem)
	}
	if c.inBlock(folded) {
		return nil
	}
	return c.ownKnown().confirm(folded, "does not stand in the drug's record")
}

// asGiven holds a sentence or limit against the text that the paper was given,
// where that is among what was asked.
func (c *check) asGiven(name, text string) *objection {
	if c.was(name) && c.asked[name][0] != text {
		return object(c.asked[name][0], "was to be printed")
	}
	return nil
}

// misquoted objects to a sentence that has the words of one in the record and
// other figures.
func (c *check) misquoted(folded string) *objection {
	words := withoutFigures(folded)
	if len(words) < 12 { // too few words to tell one sentence from another
		return nil
	}
	if i := slices.Index(c.blockTexts().words, words); i >= 0 {
		return object(c.blockTexts().folded[i], "stands in the record with other figures")
	}
	return nil
}

// withoutFigures is a sentence less its digits and the marks inside numbers.
func withoutFigures(s string) string {
	return strings.Map(func(r rune) rune {
		if unicode.IsNumber(r) || r == '.' || r == ',' {
			return -1
		}
		return r
	}, s)
}

// typedOnly objects to a figure under the name of free texts.
func typedOnly(*check, int, string) *objection {
	return object("", "is a name for texts of the order, not for a figure")
}

// readable folds a sentence, and objects to an empty and to an endless one.
func readable(text string) (string, *objection) {
	if len(text) > mostSentence {
		return "", object("", "is too long to be checked")
	}
	folded := fold(text)
	if folded == "" {
		return "", object("", "is empty")
	}
	return folded, nil
}

func (c *check) inBlock(folded string) bool {
	return slices.Contains(c.blockTexts().folded, unseparated(folded))
}

// unseparated takes the signs between thousands out of a text: they change no
// number, and each house style has its own. A sign counts where one to three
// digits stand before it and groups of exactly three follow.
func unseparated(text string) string {
	var b strings.Builder
	at := 0
	for _, found := range thousands.FindAllStringSubmatchIndex(text, -1) {
		from, to := found[2], found[3]
		if to < len(text) && text[to] >= '0' && text[to] <= '9' {
			continue // "1,2345" is no number of three digits a group
		}
		b.WriteString(text[at:from])
		b.WriteString(strings.NewReplacer(",", "", "\u00a0", "", "\u202f", "").Replace(text[from:to]))
		at = to
	}
	b.WriteString(text[at:])
	return b.String()
}

var thousands = regexp.MustCompile(`(?:^|[^0-9.,])([0-9]{1,3}(?:[,\x{00A0}\x{202F}][0-9]{3})+)`)

// confirm objects to every figure of the sentence that is not known.
func (k *known) confirm(text, why string) *objection {
	var faults []string
	for _, t := range tokens(text) {
		switch {
		case t.fault != "":
			faults = append(faults, t.fault)
		case !k.knows(t):
			faults = append(faults, strconv.Quote(t.text)+" "+why)
		}
	}
	if len(faults) == 0 {
		return nil
	}
	return object("", strings.Join(faults, "; "))
}

func (k *known) knows(t token) bool {
	if t.odd && !k.words[t.word] {
		return false
	}
	switch t.kind {
	case withUnit:
		return k.has(k.quantities, t.number.times(t.unit)) || k.printed(t.reading())
	case withoutUnit:
		return k.has(k.plain, t.number) || isSyringe(t.before) && k.has(k.syringe, t.number)
	case dateOrTime:
		return slices.ContainsFunc(k.moments, func(m token) bool {
			return (t.day == "" || t.day == m.day) && (t.clock == "" || t.clock == m.clock)
		})
	case wordWithDigits:
		return k.words[t.word]
	}
	return false
}

func isSyringe(word string) bool { return word == "syringe" || word == "Syringe" }

// A fixedSaying is a sentence of the tool itself that holds a figure of its
// own. Wherever its words stand, its figures must stand as well.
type fixedSaying struct{ whole, words string }

// fixedSayings are two. That a syringe pump is slow to begin at low rates is a
// fixed warning, no sum; the clauses are those of the label's design.
func fixedSayings() []fixedSaying {
	return []fixedSaying{
		{"below 1 mL/h a syringe pump may take many minutes to begin delivering", "a syringe pump may take many minutes to begin delivering"},
		{"layout after ISO 26825:2020, 5.2 to 5.4", "layout after ISO"},
	}
}

// withoutFixed takes the fixed sayings out of a sentence, and objects where
// one stands with other figures.
func withoutFixed(text string) (string, *objection) {
	for _, f := range fixedSayings() {
		text = bounded(text, f.whole)
		if strings.Contains(text, f.words) {
			return "", object(f.whole, "is a fixed sentence with other figures")
		}
	}
	return text, nil
}

// bounded takes a saying out where it ends with the sentence or at a mark, so
// that a digit more does not pass.
func bounded(text, saying string) string {
	front, back, found := strings.Cut(text, saying)
	if !found || back != "" && !strings.ContainsAny(back[:1], closingMarks+" ") || strings.HasPrefix(back, ".") && len(back) > 1 && back[1] != ' ' {
		return text
	}
	if front != "" && !strings.HasSuffix(front, " ") && !strings.HasSuffix(front, "(") {
		return text
	}
	return front + "…" + back
}

// isStandard knows the standards that sentences name. Their numbers measure
// nothing: ISO 7886-1 gives the reading tolerance of barrels, ISO 26825 the
// design of labels.
func isStandard(words string) bool {
	switch words {
	case "ISO 7886-1", "ISO 7886-1:1993", "ISO 26825", "ISO 26825:2020":
		return true
	}
	return false
}

// isOwnRule knows the names of this project's rules, R1 to R19.
func isOwnRule(word string) bool {
	number, ok := strings.CutPrefix(word, "R")
	n, err := strconv.Atoi(number)
	return ok && err == nil && n >= 1 && n <= 19 && strconv.Itoa(n) == number
}

// stock is the name of the blank labels, repeated letter by letter.
func stock(c *check, _ int, text string) *objection { return c.sameText(Stock, text) }
