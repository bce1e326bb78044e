//go:build !race

package dilution_test

const slowly = false
