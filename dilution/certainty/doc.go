// Package certainty states the interval in which the true concentration of a
// preparation lies, for every way in which a syringe or a bag is prepared (rule
// R9): the worst case, and the interval after GUM (ISO/IEC Guide 98-3) with
// coverage factor 2. It names what contributes most, and what it cannot cover.
//
// # What it counts
//
// Each volume read on a syringe may be off by the graduated-capacity tolerance
// of ISO 7886-1 ([syringe.Barrel.Tolerance]), the printed strength by the assay
// limits, the volume of a powder and the fill of a bag by their limits where
// those are known. Every such error is taken as rectangular between its limits
// (GUM 4.3.7; limits that do not lie evenly around the figure, as GUM 4.3.8
// does: around their middle). Mixing, loss in dead space, and slips of the hand
// are not counted.
//
// The worst case puts every error at the limit that hurts, all at once: exact
// fractions, nothing rounded. After GUM, with c the sensitivity of the
// concentration to an input, at the middle of all limits, and a the half width,
// both relative,
//
//	u² = sum of (c a)² / 3,   U = 2 u.
//
// U is a root and is rounded up at the twelfth decimal of the share, so that
// the interval is never narrower than the sum. Neither end goes beyond the worst
// case, which 2 u can pass where one input dominates.
//
// The sum is one of first order: it takes the concentration to follow each error
// in a straight line, which dividing by a badly read volume does not. Where U is
// above 50 %, or above 20 % for the volumes divided by alone (3 mL read in a 50
// mL syringe), the worst case stands for it and [Result.FirstOrder] is false.
// Where a volume drawn nearly fills the volume that it is made up to, the upper
// ends can lie above the strength itself: too wide, never too narrow.
//
// # One syringe read twice
//
// Readings of one syringe share its fault, so they are not independent; how
// they hang together is not known. Readings that carry one name
// ([Measured.Syringe]) are added up plainly before squaring: no correlation,
// whatever its sign, makes u larger (the linear sum of GUM 5.2.2, note 1, with
// every sign against us). What one syringe may cancel is not counted in favour.
// Syringes out of one box can share a fault too; who fears that gives them one
// name.
//
// # How it is called
//
// A planner builds a [Preparation] from what it measured and asks [Of]:
//
//	drug := certainty.Measured{Volume: v1, Barrel: b1}
//	final := certainty.Measured{Volume: v2, Barrel: b2}
//	r, err := certainty.Of(certainty.Preparation{
//		Strength: strength,
//		Assay:    certainty.Around(tenPerCent),
//		Steps:    []certainty.Step{certainty.MakeUpTo(final, drug)},
//	})
//
// No step at all is the drug as supplied. Two steps are a dilution through an
// intermediate syringe: the second draws from what the first makes. A drug
// mixed with another in one syringe is [AddDiluent] with the other's volume among
// the added ones, or [MakeUpTo] where the mixture is made up to a mark. A volume
// drawn in several fills is several drawn readings, of one name if they are of
// one syringe. [Compare] sets two preparations of one thing side by side.
//
// # How it stands to the interval that paper prints
//
// Paper prints one half width: the smaller of 2 u and the plain sum of the
// widths, half up to 0.1 %, the same on both sides of the concentration
// ([syringe.Interval]). [Result.Printed] is that figure from the widths found
// here. It is, to the last digit, what paper prints today for a mixture that is
// neat or made up to a volume, from a presentation that needs no mixing, with
// assay limits even around 100 % and no syringe read twice. Elsewhere:
//
//   - added to a bag: paper counts the drug's reading in full, this package only
//     the part B/(B+d) that reaches the concentration; Printed is never larger.
//   - withdraw, then add: paper counts the drug's reading in full and nothing
//     else. Here it counts (B-d)/B, and the reading of what is withdrawn d/B.
//     With one name for both the sum is paper's figure; with two it is smaller.
//   - a powder: paper takes the strength after mixing as given; here the fluid
//     added is a reading that may be off, and so is the displacement if its
//     limits are known. Printed is never smaller.
//   - assay limits that are not even, or a bag whose limits are known: paper has
//     neither. Printed stays a half width around the middle ([Result.Best]).
//
// So a paper may go on printing Printed with [Result.Stated]. [Result.GUM] and
// [Result.Worst] say more: they have two ends of their own. GUM can reach a
// little further up than Printed where the plain sum is the smaller (dividing by
// a volume that is short is more than the volume's own error), and it keeps
// within the worst case downwards.
package certainty
