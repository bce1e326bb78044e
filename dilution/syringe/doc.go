// Package syringe knows the barrels that measure a volume by hand: what they
// hold, how finely they are graduated, how far a reading may be off, and which
// of them measures a given volume (rules R8 and R9).
//
// Tolerances are those of ISO 7886-1 for the graduated capacity of single-use
// syringes for manual use. The table was read in the 1993 edition, two rows
// through a test laboratory's published working; that the 2017 edition kept the
// figures is believed and not seen. A syringe that is stored after filling is
// outside the scope of the 2017 edition, so the figures tell how well a volume
// is measured, not what a stored syringe still holds.
package syringe
