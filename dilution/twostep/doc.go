// Package twostep finds a dilution through an intermediate syringe: drug drawn
// and made up in one syringe, some of that drawn and made up in the syringe that
// is given. It is the remedy where the drug's volume is too small to measure (rule
// R8), and it is worse than one step wherever one step can be made: drugs come
// out wrong more often after two dilutions than after one (Baker, Rutherford,
// Myles, Anaesth Intensive Care 2007;35:378-381).
//
// # What is searched
//
// Every volume is one that a stocked barrel shows, not below the site's smallest,
// and each is read in the barrel whose tolerance (ISO 7886-1) is the smallest at
// that volume; of two alike in the smaller, then in the finer one. Some diluent is
// added both times, and something is left of the intermediate: without that it
// is one step in two syringes. Of all these preparations [Find] takes the one with
//
//  1. the concentration nearest to the target, at most the tolerance off;
//  2. the narrowest worst case that the four readings allow ([Plan.Spread]);
//  3. the least drug left in the intermediate syringe;
//  4. the smallest syringes, by their capacities in all;
//  5. the smaller volume made up to, then drawn, then taken.
//
// All figures are exact: volumes are whole numbers on the common grid of all
// graduations, and where products of tolerances have to be told apart they are
// compared as fractions. Up to 30,000 intermediate dilutions are weighed, those
// read most surely first; the barrels that a site is taken to hold (1 to 50 mL,
// [syringe.Stocked]) have 16,290. A search that stops there says so
// ([Found.Bounded]).
//
// # How it is called
//
// When a volume to draw is refused ([syringe.Measure]), a planner asks:
//
//	f, err := twostep.Find(twostep.Wanted{
//		Strength: strength, Concentration: target, Volume: final,
//		Barrels: site.barrels, Giving: []syringe.Barrel{chosen},
//		Smallest: site.smallest, Tolerance: site.tolerance,
//		Low: lowest, High: highest, // of the formulary, for this diluent
//	})
//
// [Found.OneStep] stands beside it where the target can be made at once; prefer
// it unless its Spread is much the larger. [Found.Rivals] are for a list of
// what was weighed, each with the [Reason] by which it lost. A reading with
// UnderFifth set is a caution, as in a plan of one step.
//
// The interval of the true concentration, with assay limits and after GUM, is
// the work of package certainty:
//
//	measured := func(r syringe.Reading) certainty.Measured {
//		return certainty.Measured{Volume: r.Volume, Barrel: r.Barrel}
//	}
//	sure, err := certainty.Of(certainty.Preparation{
//		Strength: strength, Assay: limits,
//		Steps: []certainty.Step{
//			certainty.MakeUpTo(measured(f.Intermediate.Reading), measured(f.Draw)),
//			certainty.MakeUpTo(measured(f.Final.Reading), measured(f.Take)),
//		},
//	})
//
// The four syringes are four pieces, each a new one: a measuring syringe that
// has held the strength would carry it into the intermediate. The intermediate
// gets a label of its own before anything is drawn from it: name, its own
// concentration, amount in volume, use-by, and that it is not for injection as it
// is. What the search does not know: how long the intermediate is stable, in
// what diluent, and whether the drug sticks to a syringe.
//
// [Work] works a plan from four readings that somebody else chose.
package twostep
