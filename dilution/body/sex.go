package body

import "strings"

// A Sex is the one that the equations ask for. The zero value means "not given".
type Sex int

// Sexes.
const (
	Female Sex = iota + 1
	Male
)

// String is the sex as printed: "female", "male"; "" if not given.
func (s Sex) String() string {
	switch s {
	case Female:
		return "female"
	case Male:
		return "male"
	}
	return ""
}

// SexNamed reads female, woman, girl, f, male, man, boy, m in any letter case.
func SexNamed(s string) (Sex, bool) {
	switch strings.ToLower(strings.TrimSpace(s)) {
	case "female", "woman", "girl", "f":
		return Female, true
	case "male", "man", "boy", "m":
		return Male, true
	}
	return 0, false
}
