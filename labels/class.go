package labels

// Edition is the edition of ISO 26825 that the table below follows. The
// second edition (October 2020) replaced the first of 2008; a third is in
// work, so a label says which one it follows.
const Edition = "2020"

// Layout is the only claim a label sheet makes about the standard. Adhesive,
// material and package (clauses 4.1 to 4.4) cannot be judged by software.
const Layout = "layout after ISO 26825:2020, 5.2 to 5.4"

// An RGB is a colour in sRGB, 0 to 255 each.
type RGB struct{ R, G, B uint8 }

// A Class is a group of drugs that share colour and design on a syringe label.
// The zero Class is no class.
type Class struct {
	Code   string // "NMB-R"
	Parent string // the class whose colour it shares; empty for its own
	Word   string // printed along the bottom edge, always (R16)
	// Fill is the background, or with Stripes the colour that alternates with
	// white. It is the published screen value of the ink that the standard
	// names; the standard itself gives no screen value.
	Fill    RGB
	Stripes bool // 5.2.2, 5.4.4: opposite action
	Bar     bool // black bar over the upper half, name in LetterOnBar
	Line    bool // 5.4.4: transverse black line below the name
	// LetterOnBar is the colour of the name in the bar; it means something
	// only with Bar.
	LetterOnBar RGB
}

// Colours of the table, named by hue.
var (
	white  = RGB{0xFF, 0xFF, 0xFF}
	black  = RGB{0x00, 0x00, 0x00}
	yellow = RGB{0xFF, 0xED, 0x00} // process yellow; no published screen value was found, this one is our choice
	orange = RGB{0xFF, 0x82, 0x00} // 151
	red    = RGB{0xF9, 0x42, 0x3A} // warm red
	blue   = RGB{0x71, 0xC5, 0xE8} // 297
	violet = RGB{0xD6, 0xBF, 0xDD} // 256
	grey   = RGB{0xAF, 0xA9, 0xA0} // 401
	green  = RGB{0xA4, 0xD6, 0x5E} // 367
	salmon = RGB{0xEF, 0xBE, 0x7D} // 156
)

// Classes lists all classes in a fixed order.
//
// Colours and classes are those of Table 1 of ISO 26825:2020 as a public
// summary gives them; the standard's own table was not seen. Not seen either
// and therefore our reading: the white letters in the bar of suxamethonium and
// adrenaline (2008: the label's own colour, which on black is too dim for red),
// the look of heparin and protamine, and which class "everything else" is.
// Stripes: clauses 5.2.2 and 5.4.4. Line: clause 5.4.4, a "should".
func Classes() []Class { return append([]Class{}, classes[:]...) }

// classes is the table; it never changes.
var classes = [...]Class{
	{Code: "IND", Word: "INDUCTION", Fill: yellow},
	{Code: "BZD", Word: "BENZODIAZEPINE", Fill: orange},
	{Code: "BZD-A", Parent: "BZD", Word: "BENZODIAZEPINE ANTAGONIST", Fill: orange, Stripes: true},
	{Code: "NMB", Word: "RELAXANT", Fill: red},
	{Code: "SUX", Parent: "NMB", Word: "RELAXANT", Fill: red, Bar: true, LetterOnBar: white},
	{Code: "NMB-R", Parent: "NMB", Word: "REVERSAL", Fill: red, Stripes: true, Line: true},
	{Code: "OPI", Word: "OPIOID", Fill: blue},
	{Code: "OPI-A", Parent: "OPI", Word: "OPIOID ANTAGONIST", Fill: blue, Stripes: true},
	{Code: "VAS", Word: "VASOPRESSOR", Fill: violet},
	{Code: "ADR", Parent: "VAS", Word: "VASOPRESSOR", Fill: violet, Bar: true, LetterOnBar: white},
	{Code: "HYP", Parent: "VAS", Word: "HYPOTENSIVE", Fill: violet, Stripes: true},
	{Code: "LA", Word: "LOCAL ANAESTHETIC", Fill: grey},
	{Code: "ACH", Word: "ANTICHOLINERGIC", Fill: green},
	{Code: "AEM", Word: "ANTI-EMETIC", Fill: salmon},
	{Code: "HEP", Word: "HEPARIN", Fill: white},
	{Code: "PRO", Parent: "HEP", Word: "PROTAMINE", Fill: black, Stripes: true},
	{Code: "OTH", Word: "OTHER", Fill: white},
}

// ClassOf finds a class by its code. An unknown code is no class: nothing is
// derived from a drug's name or code.
func ClassOf(code string) (Class, bool) {
	for _, c := range &classes {
		if c.Code == code {
			return c, true
		}
	}
	return Class{}, false
}

// Background is the colour behind most of the label: the class colour, or
// white where the class colour stands in stripes only.
func (c Class) Background() RGB {
	if c.Stripes {
		return white
	}
	return c.Fill
}

// Dim says whether small black type on the background needs a white panel: on
// warm red black letters keep a contrast of 5.9 to 1, but only 4.0 to 1 for a
// reader without the red receptor (simulation after Viénot, Brettel and Mollon
// 1999), under the 4.5 to 1 asked for of small text.
func (c Class) Dim() bool { return c.Background() == red }
