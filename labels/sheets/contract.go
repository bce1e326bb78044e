package sheets

import (
	"drawup/dilution"
	"drawup/labels"
)

// DrawUp is the draw-up sheet of a list. Facts has one entry a plan, in the
// order of list.Plans.
func DrawUp(list dilution.List, facts []labels.Facts, m labels.Making) []Sheet { return nil }

// PumpCards is one card for each infusion of the list, in making order.
func PumpCards(list dilution.List, facts []labels.Facts, m labels.Making) []Sheet { return nil }

// CheckSheets is two sheets for each syringe of the list, in making order: the
// blind page for the second person, then the preparer's figures.
func CheckSheets(list dilution.List, facts []labels.Facts, m labels.Making) []Sheet { return nil }
