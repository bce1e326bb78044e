// Package fonts holds the embedded type faces and says how large their
// letters are. It knows nothing of pages and imports only the standard
// library.
//
// The faces are IBM Plex Sans and IBM Plex Sans Condensed under the SIL Open
// Font License 1.1 (plex/OFL.txt). They were chosen because l, I and 1 differ
// and because all digits are equally wide. The files are unchanged.
//
// All lengths are whole micrometres. Widths are plain sums of the advance
// widths in the font's hmtx table: no kerning and no ligatures, because the
// PDF writer uses none either.
package fonts

import (
	"embed"
	"sync"
)

// Name names one of the embedded faces.
type Name string

// The embedded faces. The condensed ones are about a tenth narrower and serve
// long drug names.
const (
	Regular           Name = "regular"
	Bold              Name = "bold"
	CondensedRegular  Name = "condensed-regular"
	CondensedSemiBold Name = "condensed-semibold"
)

// Names lists all faces in a fixed order.
func Names() []Name {
	return []Name{Regular, Bold, CondensedRegular, CondensedSemiBold}
}

//go:embed plex/*.ttf plex/OFL.txt
var files embed.FS

var (
	regular           = sync.OnceValue(func() *Face { return load("plex/IBMPlexSans-Regular.ttf") })
	bold              = sync.OnceValue(func() *Face { return load("plex/IBMPlexSans-Bold.ttf") })
	condensedRegular  = sync.OnceValue(func() *Face { return load("plex/IBMPlexSansCondensed-Regular.ttf") })
	condensedSemiBold = sync.OnceValue(func() *Face { return load("plex/IBMPlexSansCondensed-SemiBold.ttf") })
)

// Get returns the face called n, parsed once for the whole program. It
// returns nil for any other name; a nil Face covers no letter, so that text
// set in it is refused rather than drawn in some other face.
func Get(n Name) *Face {
	switch n {
	case Regular:
		return regular()
	case Bold:
		return bold()
	case CondensedRegular:
		return condensedRegular()
	case CondensedSemiBold:
		return condensedSemiBold()
	}
	return nil
}

// Licence returns the text of the SIL Open Font License 1.1 under which the
// faces are passed on. Condition 2 of the licence asks for it to go with
// every copy of the fonts, and a program file with the fonts inside is one.
func Licence() string {
	text, err := files.ReadFile("plex/OFL.txt")
	if err != nil {
		return ""
	}
	return string(text)
}

// load reads one embedded file. A file that cannot be parsed gives nil, which
// the package test rules out for every face.
func load(path string) *Face {
	file, err := files.ReadFile(path)
	if err != nil {
		return nil
	}
	face, err := parse(file)
	if err != nil {
		return nil
	}
	return face
}
