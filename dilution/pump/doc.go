// Package pump turns a dose rate into the flow rate that a pump is set to, and
// back: flow = dose rate x weight or surface / concentration.
//
// Everything is exact until the pump's own step (rule R1); there the rate is
// rounded once, in a named direction, and what was lost is kept (rule R2). A
// highest rate belongs to the pump and the drug and is the caller's matter.
package pump
