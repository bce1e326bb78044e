package refusal

func shelfEntries() []Entry {
	return []Entry{
		stops(ShelfEmpty, Files, "R10", "A shelf file lists no ampoule or vial."),
		stops(BarrelNone, Files, "R8", "A shelf file lists no syringe."),
		stops(BarrelOffStandard, Files, "R8", "A syringe on the shelf has a graduation or a dead space that its standard does not allow."),
		stops(StockOtherDrug, Files, "R10", "The shelf lists, under one drug, the ampoule or vial of another."),
		stops(NotStocked, Choices, "R10", "The ampoule or vial that is ordered is not on the shelf."),
		stops(StockShort, Choices, "R10", "The shelf has too few ampoules or vials for what is ordered."),
		stops(NoneStockedFits, Choices, "R8", "Nothing on the shelf can be made into what is ordered."),
		stops(DiluentNotStocked, Choices, "R10", "The diluent, or a bag of the size that is ordered, is not on the shelf."),
		stops(SyringeNotForPump, Measuring, "R8", "No pump on the shelf takes a syringe of that size."),
		either(SearchCut, Measuring, "R8", "There were more ways to make it than are looked at; the best of those seen is given, or none."),
		warns(DilutedToMeasure, Measuring, "R8", "The neat dose cannot be measured, so that it is diluted first."),
		warns(DeadSpaceCounts, Measuring, "R8", "What stays in the needle is more of the drug than the site's tolerance."),
		stops(HoursNotReached, Limits, "R8", "The syringe would be empty before the hours that are asked for."),
		warns(MadeForOneWeight, Limits, "R10", "The mixture fits one weight and no other patient."),
	}
}
