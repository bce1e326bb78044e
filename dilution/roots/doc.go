// Package roots works roots, powers and logarithms in whole numbers: no binary
// floating point takes part (rule R1). A result that no fraction holds is given
// to [Digits] significant digits, rounded once, half up.
package roots

// Digits is how far such a result is worked before it is rounded once.
const Digits = 40
