package refusal

// An Instead is a preparation that can be made in place of the one that is
// refused, worked in full: it has passed every rule that the order was held
// against. Figures are as paper would print them.
type Instead struct {
	Says         string   // the whole of it in words
	Write        []Line   // what the order has to say for it
	TakeOut      []string // keys that the order then no longer has
	Presentation string
	Containers   int
	Method       string
	Diluent      string // "" for neat

	DrugVolume, DiluentVolume, FinalVolume Figure
	MeasuringSyringe, GivingSyringe        Figure // nominal capacities
	Amount, Concentration                  Figure
	DoseVolume, DoseDelivered              Figure // of one dose, where one is ordered
	PumpRate                               Figure // of the start, for an infusion
}

// A Line is one line of an order.
type Line struct{ Key, Value string }

// A Figure is one quantity: exact (a decimal or a fraction), as printed, and its
// unit. The zero Figure is none.
type Figure struct{ Exact, Printed, Unit string }

// Given reports whether there is a figure.
func (f Figure) Given() bool { return f.Printed != "" }
