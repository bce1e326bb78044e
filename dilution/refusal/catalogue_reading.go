package refusal

func quantityEntries() []Entry {
	return []Entry{
		stops(QuantityMissing, Quantities, "R1", "A quantity is needed and none is written."),
		stops(NumberWithComma, Quantities, "R1", "A number has a comma, which may be a decimal sign or a grouping."),
		stops(NumberMalformed, Quantities, "R1", "A number has two points, a naked point, a sign, an exponent, a fraction or a stray letter."),
		stops(NumberTooLong, Quantities, "R1", "A number has more digits than any dose has."),
		stops(UnitUnknown, Quantities, "R1", "A unit is missing or is not one of those that are read."),
		stops(UnitWrongKind, Quantities, "R1", "A unit is known but measures something else than what is asked."),
		stops(QuantityZero, Quantities, "R1", "A quantity is nothing, where nothing makes no sense."),
		stops(RatioStrength, Quantities, "R14", "A ratio such as 1:1000 is written, and its unit cannot be told."),
		stops(AmountKindDiffer, Quantities, "R4", "Mass, units and amount of substance meet; they never convert into each other."),
	}
}

func requestEntries() []Entry {
	return []Entry{
		stops(FlagMissing, Requests, "", "The command needs one more flag or file."),
		stops(FlagConflict, Requests, "", "Two flags say different things, or a flag has a value that makes no sense with it."),
		stops(FlagUnknown, Requests, "", "The command or the flag does not exist."),
		stops(SyringeNumber, Requests, "", "A syringe is asked for by a number that the order does not have."),
		stops(StockUnknown, Requests, "R15", "A stock of blank labels is asked for that is not on record."),
		stops(OutputUnwritable, Requests, "", "A result cannot be written to where it should go."),
		warns(LimitsNotChecked, Requests, "R10", "A sum was worked without a drug or without a dose, so no limits were checked."),
		warns(QuickCheck, Requests, "R13", "A quick sum was held against the stored limits of the drug and nothing else."),
	}
}

func fileEntries() []Entry {
	return []Entry{
		stops(FileUnreadable, Files, "", "A file does not exist, is a folder, or may not be read."),
		stops(FileEmpty, Files, "", "A file has nothing in it."),
		stops(FileTooLarge, Files, "", "A file is larger than any order or formulary."),
		stops(FileNotText, Files, "", "A file is not plain text in UTF-8."),
		stops(FileSyntax, Files, "", "A file breaks the rules of its format."),
		stops(KeyUnknown, Files, "", "A key is not one that the file may have; it may be misspelt."),
		stops(KeyRepeated, Files, "", "A key, a patient or a drug name stands twice."),
		stops(KeyMissing, Files, "", "A key that is needed is not there."),
		stops(KeyConflict, Files, "", "Two keys say different things, or limits are out of order."),
		stops(ValueWrongType, Files, "", "A value is a number, date or table where a text is needed, or the other way round."),
		stops(ValueUnknown, Files, "", "A value is not one of those that the key may have."),
		stops(ProductNumber, Files, "", "A trade item number (GTIN) has a wrong check digit or length, or is none of a company's own."),
		stops(TimeMalformed, Files, "R18", "A date, a time or a time zone cannot be read, or does not exist in that zone."),
		stops(SourceNowhere, Files, "R13", "A source of the formulary does not say where it holds."),
		stops(ContentsUnlike, Files, "R13", "The name of an ampoule or vial and what the record says is in it do not agree."),
		stops(FactorOff, Files, "R4", "A factor for a salt or for mmol is more than 2 % off the one from molar masses."),
		stops(StandardOutside, Files, "R10", "A standard preparation is outside the bounds of concentration for its line."),
		stops(StandardDiluent, Files, "R10", "No ampoule or vial may be made up as a standard preparation says."),
		stops(RowsOverlap, Files, "R10", "Two rows of limits for one purpose hold for the same age."),
		stops(Implausible, Files, "R13", "A figure is far from what others of its class, or its own neighbours, are; a unit may be wrong."),
		stops(LimitLoosened, Files, "R13", "A site's file lets through what the formulary under it does not, and gives no reason."),
		stops(ApprovedOnce, Files, "R13", "One person has signed an approval twice."),
		stops(ApprovedOther, Files, "R13", "The approval is for another formulary, or for another text of it."),
		stops(ApprovalPast, Files, "R13", "The approval is past its day of review, or begins later."),
		stops(NothingToMake, Files, "", "The order has no syringe, or all of them are left out."),
		stops(SyringesMany, Files, "", "The order has more syringes than the serial numbers have room for."),
	}
}

func patientEntries() []Entry {
	return []Entry{
		stops(WeightMissing, Patients, "R3", "A dose goes by weight and the patient has none."),
		either(WeightImplausible, Patients, "R3", "A body weight is one that no patient has, or few children of that age."),
		stops(SurfaceMissing, Patients, "R3", "A dose goes by body surface area and none is given."),
		stops(HeightMissing, Patients, "R3", "A weight or surface has to be worked out and the height is not given."),
		stops(HeightImplausible, Patients, "R3", "A height is one that no patient has."),
		stops(SexMissing, Patients, "R3", "A weight has to be worked out and the sex is not given."),
		either(AgeMissing, Patients, "R3", "Limits depend on age, or a weight equation holds for adults only, and the age is not given."),
		either(BodySizeOutside, Patients, "R3", "A weight equation is used outside the bodies that it was made for."),
		warns(LeanPlateau, Patients, "R3", "Lean weight is above the value at which guidance lets doses stop rising."),
		warns(WeightEstimated, Patients, "R3", "The body weight is an estimate, not a measurement."),
		stops(BodyValuesStrange, Patients, "R3", "Age, weight and height do not fit each other."),
	}
}
