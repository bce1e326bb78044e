package certainty

import "fmt"

// A Part is one sort of thing that makes a concentration uncertain. The zero
// value is none.
type Part int

// Parts.
const (
	Assay        Part = iota + 1 // what the container really holds
	PowderFluid                  // reading the fluid that a powder is mixed with
	Displacement                 // the powder's own volume
	DrugDrawn                    // reading what is drawn
	FinalVolume                  // reading the mark that is made up to
	DiluentAdded                 // reading the diluent that is added
	BagFill                      // what the bag holds
	FluidRemoved                 // reading what is withdrawn from the bag
)

// String is the part in words.
func (p Part) String() string {
	switch p {
	case Assay:
		return "assay limits of the presentation"
	case PowderFluid:
		return "fluid added to the powder"
	case Displacement:
		return "volume of the powder"
	case DrugDrawn:
		return "volume drawn"
	case FinalVolume:
		return "final volume"
	case DiluentAdded:
		return "diluent added"
	case BagFill:
		return "fill of the bag"
	case FluidRemoved:
		return "volume withdrawn"
	}
	return ""
}

// A Source is one input: which part, in which step (from 1; 0 for the container
// itself), and the reading, if it is one.
type Source struct {
	Part    Part
	Step    int
	Reading Measured
}

// String says which reading of which step it is: "volume drawn in step 2, 1 mL
// in a 2 mL syringe".
func (s Source) String() string {
	text := s.Part.String()
	if s.Step > 0 {
		text += fmt.Sprintf(" in step %d", s.Step)
	}
	if s.Reading.Barrel.Given() {
		text += fmt.Sprintf(", %s mL in a %s mL syringe", s.Reading.Volume.Exact(), s.Reading.Barrel.Nominal().Exact())
	}
	return text
}
