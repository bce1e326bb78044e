package refusal

// barcodeEntries are about a code that somebody scanned. Their rules are those
// of GS1 and of the labels' own form, which the messages name.
func barcodeEntries() []Entry {
	return []Entry{
		stops(CodeEmpty, Barcodes, "", "There is no code to read."),
		stops(CodeForeign, Barcodes, "", "The text is not made of GS1 element strings, or comes from a symbol that has none."),
		stops(CodeIdentifier, Barcodes, "", "A code has an application identifier that GS1 does not have."),
		stops(CodeLength, Barcodes, "", "A value of a code is longer or shorter than its identifier allows."),
		stops(CodeSign, Barcodes, "", "A value of a code has a sign that it may not hold."),
		stops(CodeCheckDigit, Barcodes, "", "The check digit of a number in a code does not fit the other digits."),
		stops(CodeMoment, Barcodes, "", "A code gives a day or a time that does not exist."),
		stops(CodePairing, Barcodes, "", "A code has an identifier without one that it needs, or beside one that it excludes."),
		stops(CodeRepeated, Barcodes, "", "A code has an identifier twice."),
		stops(CodeContent, Barcodes, "", "A company-internal value is not of the form that labels of this program have."),
		stops(CodeSeparator, Barcodes, "", "Two values of a code stand together because the separator between them went missing."),
		warns(CodeRunTogether, Barcodes, "", "A batch or serial number may hold the next value, since the code came without separators."),
		warns(CodePast, Barcodes, "R18", "The use-by time or expiry date that a code gives is past."),
		warns(CodeDrug, Barcodes, "R10", "The drug of a code is not in this formulary, or the code names none."),
		warns(CodeFormulary, Barcodes, "R19", "The label was made from another formulary than the one here."),
	}
}
