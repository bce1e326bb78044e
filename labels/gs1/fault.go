package gs1

import "fmt"

// A Kind is the rule that a code breaks.
type Kind int

// Kinds of faults. The zero Kind is none.
const (
	Empty      Kind = iota + 1 // there is nothing to read
	Foreign                    // it is not made of element strings
	Unknown                    // an identifier that the dictionary does not have
	Length                     // a value too long or too short
	Sign                       // a sign that a value may not hold
	WrongDigit                 // the last digit does not fit the others
	Moment                     // a day or time that does not exist
	Pairing                    // an identifier without one that it needs, or beside one that it excludes
	Repeated                   // an identifier twice
	Content                    // a company's own value of another form than its reader expects
	Lost                       // a value with the next identifier in it: a separator went missing on the way
)

// A Fault is one thing that is wrong with a code.
type Fault struct {
	Kind Kind
	AI   string // the identifier that it concerns, "" for none
	// At is the place in the text that was scanned, in signs counted from 1; 0
	// in elements that were not scanned.
	At   int
	Got  string
	Want string

	element int // its number, from 0
	offset  int // signs of its value before the fault; below zero for the identifier itself
}

// Error names the identifier, what it got and what it wants.
func (f Fault) Error() string {
	if f.AI == "" {
		return fmt.Sprintf("got %s, want %s", f.Got, f.Want)
	}
	return fmt.Sprintf("(%s): got %s, want %s", f.AI, f.Got, f.Want)
}
