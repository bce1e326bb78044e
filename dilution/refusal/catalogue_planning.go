package refusal

func choiceEntries() []Entry {
	return []Entry{
		stops(DrugUnknown, Choices, "R10", "The formulary has no drug of that name."),
		stops(PresentationUnknown, Choices, "R10", "The formulary has no such ampoule or vial of the drug."),
		stops(PresentationUnclear, Choices, "R10", "The drug comes in several ampoules or vials and the order names none."),
		stops(PresentationNotPump, Choices, "R10", "That ampoule or vial is not listed for this use, bolus or infusion."),
		stops(StandardUnknown, Choices, "R10", "The formulary has no such standard preparation of the drug."),
		stops(DiluentForbidden, Choices, "R10", "The fluid must not be mixed with the drug."),
		stops(DiluentNotListed, Choices, "R10", "The formulary does not list the fluid for that ampoule or vial."),
		either(DiluentMissing, Choices, "R5", "The order does not say what to dilute with, or names a fluid for a syringe that takes none."),
		stops(MustBeDiluted, Choices, "R10", "The ampoule or vial may not be given undiluted."),
		stops(RouteNotListed, Choices, "R10", "The formulary has no dose by that route."),
		stops(PairNever, Choices, "R11", "The formulary keeps the two drugs apart: they must never share a syringe."),
		stops(PairNotListed, Choices, "R10", "The formulary does not name the two drugs as a pair that may share a syringe."),
		stops(PreservedNeuraxial, Choices, "R11", "A preserved presentation is asked for by an epidural or intrathecal route."),
		stops(StandardElsewhere, Choices, "R10", "The standard preparation belongs to another jurisdiction than the site's."),
		stops(NeverAsInfusion, Choices, "R11", "The drug must never be given as an infusion."),
		stops(NeverAsBolus, Choices, "R11", "The drug must never be given as a bolus."),
		either(FormularyBlank, Choices, "R10", "The formulary lacks the figure that is needed; a blank is never filled by a guess."),
		stops(DisplacementBlank, Choices, "R7", "The volume that a powder takes up is not on record."),
		warns(NegligibleDisplacement, Choices, "R7", "The volume that a powder takes up counts as nothing, as its source says."),
		stops(IndicationUnclear, Choices, "R10", "The dose is right for one purpose and wrong for another, and the order names none."),
		stops(AgeOutside, Choices, "R10", "The formulary has no dose for a patient of that age."),
		warns(FrailBlank, Choices, "R10", "The patient is frail, and the formulary has no figures for the frail."),
		warns(WeightFromFormulary, Choices, "R3", "A dose per kg names no weight, and the formulary goes by another than the actual one."),
		warns(WeightBasisUnlike, Choices, "R3", "The order goes by another weight than the formulary does."),
		warns(Unverified, Choices, "R13", "A figure was used that nobody has verified."),
		warns(AssayAssumed, Choices, "R9", "No assay limits are on record, so a wide pharmacopoeia range is assumed."),
	}
}

func limitEntries() []Entry {
	return []Entry{
		stops(ConcentrationTooHigh, Limits, "R10", "The mixture is stronger than the formulary allows, or than the ampoule is."),
		stops(ConcentrationTooLow, Limits, "R12", "The mixture is weaker than the formulary allows."),
		stops(DoseAboveHard, Limits, "R11", "The dose is above the highest that is stored."),
		warns(DoseAboveSoft, Limits, "R11", "The dose is above the soft limit, and a named person has signed for it."),
		warns(DoseAboveUsual, Limits, "R10", "The dose is above what is usual."),
		warns(DoseBelowSoft, Limits, "R10", "The dose is below what is usual."),
		stops(DoseBelowHard, Limits, "R11", "The dose is below the lowest that may be given."),
		stops(DoseAboveTotal, Limits, "R11", "The dose is above the absolute maximum, whatever the weight."),
		warns(OneWeightOnly, Limits, "R10", "A syringe was mixed for one body weight and fits no other patient."),
		either(DoseAboveFirst, Limits, "R10", "The dose is above the highest first dose, or above the highest repeat too."),
		stops(DoseAboveDay, Limits, "R11", "One dose is more than all doses of a day, or of a course, may come to."),
		warns(AmountAboveCourse, Limits, "R10", "The syringe holds more than all doses of a day, or of a course, may come to."),
		warns(RunsTooLong, Limits, "R10", "At the start rate the infusion would run longer than the formulary allows."),
		either(LocalSum, Limits, "R11", "The local anaesthetics of one patient together pass their maxima, or cannot be added up."),
		stops(RateAboveHard, Limits, "R11", "The dose rate is above the highest that is stored."),
		warns(RateAboveSoft, Limits, "R11", "The dose rate is above the soft limit, and a named person has signed for it."),
		warns(RateAboveUsual, Limits, "R10", "The dose rate is above what is usual."),
		stops(RateBelowHard, Limits, "R11", "The dose rate is below the lowest that may be given."),
		warns(RateBelowSoft, Limits, "R10", "The dose rate is below what is usual."),
		stops(SlipThousand, Limits, "R10", "The figure is far outside the limits, as when a unit is written for another."),
		stops(SlipTen, Limits, "R10", "The figure is outside the limits by a tenfold or more, as when a decimal point slips."),
		stops(RoundedPastLimit, Limits, "R11", "A dose or rate within its limit would pass it on the nearest graduation or pump step."),
		stops(SoftLimitNotSigned, Limits, "R11", "The figure is above the soft limit and nobody has signed for it."),
		stops(ContradictoryAmounts, Limits, "R5", "Amounts, volumes and doses of one syringe cannot all hold."),
	}
}

func measuringEntries() []Entry {
	return []Entry{
		stops(VolumeBelowMeasurable, Measuring, "R8", "A volume is smaller than the site measures."),
		either(VolumeOffGraduation, Measuring, "R8", "A volume lies between graduations: moved with a caution, or refused when too far off."),
		stops(VolumeAboveSyringe, Measuring, "R8", "A volume does not fit into the syringe."),
		warns(VolumeUnderFifth, Measuring, "R8", "A volume fills less than a fifth of the smallest barrel that fits."),
		stops(SyringeUnknown, Measuring, "R8", "A syringe size is asked for that is not stocked."),
		warns(ContainersMany, Measuring, "R8", "More than ten ampoules have to be opened for one syringe."),
		warns(BagFillUnknown, Measuring, "R9", "A bag holds more than its nominal volume, by an unknown amount."),
		stops(RateBelowPump, Measuring, "R8", "A dose rate needs less than half of the pump's smallest step."),
		either(RateAbovePump, Measuring, "R8", "A dose rate needs more than pumps in common use can be set to: refused in an order, told with a quick sum."),
		either(RateRounding, Measuring, "R2", "Rounding to the pump's step changes the dose beyond tolerance; refused when it adds more than twice that."),
		warns(RateSlow, Measuring, "R8", "Below 1 mL/h a pump may take many minutes to begin delivering."),
		stops(ExpiredPresentation, Times, "R18", "The ampoule or vial is past its expiry date."),
		warns(UseByUnknown, Times, "R18", "No stability is on record, so site policy alone sets the use-by time."),
		warns(RunsPastUseBy, Times, "R18", "At the start rate a syringe or bag would still run after its use-by time."),
	}
}

func paperEntries() []Entry {
	return []Entry{
		stops(LabelTooSmall, Papers, "R15", "A label cannot hold name, concentration and use-by on that stock."),
		warns(LabelMoved, Papers, "R15", "A label does not fit its stock and stands on the sheet of larger ones."),
		warns(LabelsTogether, Papers, "", "Labels of a whole list are printed at once, before the syringes are filled."),
		stops(GlyphMissing, Papers, "R15", "A text has a letter that no embedded face can show."),
		either(TextTooLong, Papers, "R15", "A text does not fit: refused in an order and on a sheet, left to the draw-up sheet on a label."),
		warns(LabelEdition, Papers, "R16", "The site has picked the older edition of the standard for syringe labels, or a regional colour."),
		either(TextMisread, Papers, "R14", "A text in a person's words has a number, unit or name in a form that is known to be misread."),
		warns(SyringesLeftOut, Papers, "", "Syringes were left out on request."),
		stops(RoutesDisagree, Routes, "R17", "The second route comes to another result: a fault of this program."),
	}
}
