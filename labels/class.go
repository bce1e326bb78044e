package labels

// Edition is the edition of ISO 26825 whose classes a label has when a site
// picks none. The second edition (October 2020) replaced the first of 2008; a
// third is in work, so a label says which one it follows.
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
	// Edition is the edition that the class follows, Region the regional option
	// of its scheme, "" for none.
	Edition, Region string
	// Basis says how far the design was seen: clause, summary or reading; Why
	// what it rests on.
	Basis, Why string
}

// The palette, named by hue.
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
	teal   = RGB{0x00, 0xA4, 0x99} // regional; no published screen value was seen, this one is our choice
)

// hue is a colour of the palette by its name in the table of classes.
func hue(name string) (RGB, bool) {
	switch name {
	case "white":
		return white, true
	case "black":
		return black, true
	case "yellow":
		return yellow, true
	case "orange":
		return orange, true
	case "red":
		return red, true
	case "blue":
		return blue, true
	case "violet":
		return violet, true
	case "grey":
		return grey, true
	case "green":
		return green, true
	case "salmon":
		return salmon, true
	case "teal":
		return teal, true
	}
	return RGB{}, false
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

// Claim is what a label of this class may say about the standard; of the
// edition of 2008, whose clauses were not read, less than of the other.
func (c Class) Claim() string {
	if c.Edition == "2008" {
		return "layout after ISO 26825:2008, white letters in the bar"
	}
	return Layout
}
