package refusal

// A Family is the part of the work that a code belongs to.
type Family string

// Families, in the order in which the work meets them.
const (
	Quantities Family = "quantities" // a text that should be a quantity
	Requests   Family = "requests"   // words on the command line
	Files      Family = "files"      // order and formulary files
	Patients   Family = "patients"   // body values and what follows from them
	Choices    Family = "choices"    // drug, presentation, diluent, route against the formulary
	Limits     Family = "limits"     // concentrations, doses, dose rates
	Measuring  Family = "measuring"  // barrels, bags, pumps
	Times      Family = "times"      // use-by and expiry
	Papers     Family = "papers"     // labels and sheets
	Barcodes   Family = "barcodes"   // scanned codes
	Routes     Family = "routes"     // the program's check of itself
)

// An Entry explains one code.
type Entry struct {
	Code     Code
	Family   Family
	Says     string // one sentence: when the code comes
	Rule     string // the rule of the design behind it, "R8"; "" for plain reading
	Refuses  bool   // may come as a refusal
	Cautions bool   // may come as a caution
}

// May reports whether the code may come with severity s.
func (e Entry) May(s Severity) bool {
	switch s {
	case Refuse:
		return e.Refuses
	case Caution:
		return e.Cautions
	}
	return false
}

// All is the catalogue: every code once, by family.
func All() []Entry {
	var all []Entry
	for _, part := range [][]Entry{
		quantityEntries(), requestEntries(), fileEntries(), patientEntries(),
		choiceEntries(), limitEntries(), measuringEntries(), shelfEntries(), paperEntries(), barcodeEntries(),
	} {
		all = append(all, part...)
	}
	return all
}

// Lookup finds the entry of a code.
func Lookup(c Code) (Entry, bool) {
	for _, e := range All() {
		if e.Code == c {
			return e, true
		}
	}
	return Entry{}, false
}

// stops is an entry of a code that always refuses.
func stops(c Code, f Family, rule, says string) Entry {
	return Entry{Code: c, Family: f, Says: says, Rule: rule, Refuses: true}
}

// warns is an entry of a code that is always a caution.
func warns(c Code, f Family, rule, says string) Entry {
	return Entry{Code: c, Family: f, Says: says, Rule: rule, Cautions: true}
}

// either is an entry of a code that comes both ways.
func either(c Code, f Family, rule, says string) Entry {
	return Entry{Code: c, Family: f, Says: says, Rule: rule, Refuses: true, Cautions: true}
}
