// Package body works the weights and the surface area that a dose can go by,
// from sex, age, height and weight, by published equations.
//
// Every sum is exact (rule R1). Only surface areas need roots and powers: they
// are worked in whole numbers to 40 significant digits and rounded once, half
// up. What is printed and dosed by is rounded once more, in [Size.Used] and
// [Size.UsedSurface] (rule R2). The equations are known to fail in places: an
// error ([*OutsideEquation]) stands where a figure would be wrong, a [Note]
// where it stands but needs a second look. Nothing is clamped.
package body
