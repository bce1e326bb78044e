// Package dilution works one order into one plan: which containers to take,
// what to draw, what to add, what the syringe then holds, and how the dose
// or the pump rate follows; or it says every reason why not.
package dilution

import (
	"math/big"
	"time"

	"drawup/dilution/body"
	"drawup/dilution/formulary"
	"drawup/dilution/order"
	"drawup/dilution/pump"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
	"drawup/dilution/syringe"
)

// A Method is which of the sums of rule R5 a mixture follows.
type Method int

// Methods. The zero value is no method.
const (
	Neat            Method = iota + 1 // as supplied, or as mixed from powder
	MakeUpTo                          // drug, then diluent up to the final volume
	AddTo                             // drug added to a bag that is already full
	WithdrawThenAdd                   // the drug's volume taken out of the bag first
)

// String is the method's name on paper.
func (m Method) String() string {
	switch m {
	case Neat:
		return "neat"
	case MakeUpTo:
		return "make up to"
	case AddTo:
		return "add to"
	case WithdrawThenAdd:
		return "withdraw, then add"
	}
	return ""
}

// A Mixture is what is taken, what is added, and what results. Amounts and
// volumes are exact and balance: taken = in the syringe + left over (R6).
type Mixture struct {
	Method        Method
	Containers    int                    // of all sizes together
	Packs         []Pack                 // what is opened, by size; one entry where all are alike
	AddBarrel     syringe.Barrel         // measures the fluid for a powder; not given without a shelf
	Fluids        []FluidPack            // containers of diluent to fetch; none without a shelf that lists them
	Strength      quantity.Concentration // of the presentation, after mixing a powder
	DrugWanted    quantity.Volume        // exact, before the graduation
	DrugVolume    quantity.Volume
	DrugReading   syringe.Reading
	Diluent       string // "" when neat
	AddFluid      string // powder: the fluid it is mixed with
	DiluentVolume quantity.Volume
	FinalVolume   quantity.Volume
	FinalBarrel   syringe.Barrel // not given for a bag
	InBag         bool
	Amount        quantity.Amount
	Concentration quantity.Concentration
	LeftVolume    quantity.Volume
	LeftAmount    quantity.Amount
	SecondAmount  quantity.Amount
	SecondConc    quantity.Concentration
	Substance     quantity.Amount
	SubstanceConc quantity.Concentration
	Assay         quantity.Percent
	AssayAssumed  bool
	Interval      quantity.Percent
	Low, High     quantity.Concentration
}

// A Pack is some containers of one presentation.
type Pack struct {
	Presentation formulary.Presentation
	Count        int
}

// A FluidPack is some containers of one fluid.
type FluidPack struct {
	Name, Container string
	Volume          quantity.Volume // of one
	Count           int
	ForPowder       bool // to mix the powder with, not to dilute
}

// Mixed reports whether containers of several sizes are opened.
func (m Mixture) Mixed() bool { return len(m.Packs) > 1 }

// A DosePart is one dose out of the syringe.
type DosePart struct {
	Ordered   quantity.Dose
	By        body.Kind
	Weight    quantity.BodyWeight // the rounded weight it goes by, if any
	Surface   quantity.BodySurfaceArea
	Amount    quantity.Amount // exact
	Wanted    quantity.Volume // exact, before the graduation
	Volume    quantity.Volume // on the giving barrel's graduation
	Step      quantity.Volume
	Delivered quantity.Amount
	Rule      formulary.Rule[quantity.Dose]

	// Down says that the graduation below was taken, because the nearest one
	// would have passed a limit.
	Down     bool
	ceilings []bound // that the delivered dose must not pass by rounding
}

// An InfusionPart is how the pump is set.
type InfusionPart struct {
	By      body.Kind
	Weight  quantity.BodyWeight
	Surface quantity.BodySurfaceArea
	Step    quantity.FlowRate
	Start   pump.Setting
	Down    bool         // the start rate was rounded down, because the nearest step passes a limit
	Low     pump.Setting // ends of the range to titrate in
	High    pump.Setting
	Limit   pump.Setting // hard limit of the formulary, if it has one
	Ladder  []pump.Setting
	Slips   []pump.SlipReading
	Minutes int64 // until empty at the start rate
	// Usable is Minutes less what the line takes and what stays behind.
	Usable             int64
	Wanted             int64           // how long it is to last; 0 when the order does not say
	Priming, DeadSpace quantity.Volume // not given: nothing is counted off
	// Each is the dose rate that 1 mL/h gives, for a mixture made for one weight.
	Each quantity.DoseRate
	// RuleAmount is what the rule of such a mixture comes to, before the drug is
	// moved to a graduation.
	RuleAmount quantity.Amount
	Rule       formulary.Rule[quantity.DoseRate]
}

// CountsOff reports whether part of the syringe never reaches the patient: it
// fills the line, or stays behind.
func (p InfusionPart) CountsOff() bool { return p.Priming.Given() || p.DeadSpace.Given() }

// A UseBy is until when a syringe may be used, and why.
type UseBy struct {
	At      time.Time
	Minutes int64
	Won     string // "site policy", "stability in glucose 5 %", "expiry of the ampoule"
	Source  string

	// Stability reports whether the formulary has a room-temperature stability
	// for this preparation at all, whichever limit won.
	Stability bool
}

// A Plan is one syringe, worked.
type Plan struct {
	Number int
	Order  order.Syringe // as typed
	// Settled is the order with what the planner chose filled in: a concentration
	// and a volume, a standard preparation. It is Order where nothing was open.
	Settled   order.Syringe
	Choices   []Choice
	FromShelf bool // planned from a shelf
	// NeedleDeadSpace is the shelf's figure for the needle that draws; not given
	// without one.
	NeedleDeadSpace quantity.Volume
	Patient         order.Patient
	Size            body.Size
	Style           quantity.Style
	Drug            formulary.Drug
	Name            string // of the drug, as the papers print it
	Other           string // its name elsewhere, where the site prints both
	Presentation    formulary.Presentation
	Route           string
	Mixture         Mixture
	Dose            *DosePart     // nil when no dose was ordered
	Infusion        *InfusionPart // nil for a bolus syringe
	Prepared        time.Time
	UseBy           UseBy
	Standard        string // the standard preparation's id, if it is one
	// Edition and Region are the scheme of label classes that the site has
	// picked; "" for the usual one.
	Edition, Region string
	Cautions        refusal.List
}

// A List is all syringes of an order that are made, in making order.
type List struct {
	Order     order.Order
	Formulary *formulary.Formulary
	At        time.Time // time prepared
	Plans     []Plan
	LeftOut   []LeftOut
	Cautions  refusal.List // those that concern the whole list
}

// A LeftOut is a syringe that was left out on request, and why it would have
// been refused.
type LeftOut struct {
	Number  int
	Drug    string
	Reasons refusal.List
}

// percentOf turns a share in per cent into text for messages.
func percentOf(s quantity.Style, r *big.Rat) string {
	return s.Number(new(big.Rat).Abs(r)) + " %"
}
