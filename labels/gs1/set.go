package gs1

import "strings"

// A set is the signs that a component may hold.
type set byte

const (
	numeric set = iota + 1
	set82       // GS1 General Specifications, figure of the 82 signs
	set39       // figure of the 39 signs
	base64      // the 64 signs for file names, and = to fill up
)

// holds says whether c is a sign of the set.
func (s set) holds(c rune) bool {
	digit, capital, small := c >= '0' && c <= '9', c >= 'A' && c <= 'Z', c >= 'a' && c <= 'z'
	switch s {
	case numeric:
		return digit
	case set82:
		return digit || capital || small || c != 0 && strings.ContainsRune(`!"%&'()*+,-./:;<=>?_`, c)
	case set39:
		return digit || capital || c == '#' || c == '-' || c == '/'
	case base64:
		return digit || capital || small || c == '-' || c == '_' || c == '='
	}
	return false
}

func (s set) String() string {
	switch s {
	case numeric:
		return "a digit"
	case set82:
		return `one of the 82 signs: letters without accents, digits, ! " % & ' ( ) * + , - . / : ; < = > ? _`
	case set39:
		return "one of the 39 signs: capital letters, digits, # - /"
	case base64:
		return "a letter without accent, a digit, - or _"
	}
	return ""
}
