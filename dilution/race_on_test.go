//go:build race

package dilution_test

// slowly says that the race detector makes everything ten times slower.
const slowly = true
