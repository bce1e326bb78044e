package verify

import (
	"drawup/dilution/formulary"
	"drawup/dilution/quantity"
)

// groupSize is what is plausible for the drugs of one ATC group: of those that
// share the label class of everything else, and of those counted in units or mmol.
// The longest group that the code begins with counts; "" is none.
func groupSize(d formulary.Drug) (size, string) {
	groups := massGroups()
	switch d.Kind {
	case quantity.ByActivity:
		groups = unitGroups()
	case quantity.BySubstance:
		groups = substanceGroups()
	case quantity.ByMass:
	}
	for n := len(d.ATC); n > 2; n-- {
		if s, ok := groups[d.ATC[:n]]; ok && (d.Class == "OTH" || d.Kind != quantity.ByMass) {
			return s, d.ATC[:n]
		}
	}
	return size{}, ""
}

// none is a span for what a group is not given as.
var none = span{"0", "1000000"}

func massGroups() map[string]size {
	return map[string]size{
		"A10":     {none, none, none},
		"B01":     {span{"0.3", "300"}, span{"0.03", "3"}, span{"0.006", "8"}}, // argatroban, bivalirudin
		"B02":     {span{"10", "300"}, span{"3", "60"}, span{"0.3", "20"}},
		"B05":     {span{"15", "1500"}, span{"3", "1200"}, span{"4", "20000"}},        // glucose, mannitol, fat, magnesium, calcium
		"C01A":    {span{"0.03", "1"}, span{"0.0005", "0.03"}, span{"0.001", "0.03"}}, // digoxin
		"C01B":    {span{"10", "200"}, span{"0.5", "20"}, span{"0.1", "50"}},          // amiodarone
		"C01CA02": {span{"0.05", "1"}, none, span{"0.00015", "0.03"}},                 // isoprenaline
		"C01CA07": {span{"2", "150"}, none, span{"0.05", "8"}},                        // dobutamine
		"C01CE":   {span{"0.06", "15"}, span{"0.015", "3"}, span{"0.007", "16"}},      // milrinone, enoximone
		"C01CX":   {span{"0.8", "8"}, none, span{"0.001", "0.04"}},                    // levosimendan
		"C01E":    {span{"0.1", "10"}, span{"0.01", "1"}, span{"0.00005", "25"}},      // adenosine, alprostadil
		"C02AC":   {span{"0.03", "1.5"}, span{"0.0001", "0.015"}, span{"0.0001", "0.012"}},
		"C03":     {span{"3", "30"}, span{"0.1", "3"}, span{"0.01", "7"}},
		"C08":     {span{"0.8", "8"}, span{"0.01", "1"}, span{"0.02", "0.5"}},
		"G02":     {span{"0.08", "1.5"}, span{"0.001", "0.03"}, none},
		"H01":     {span{"0.03", "0.3"}, span{"0.0005", "0.005"}, none}, // carbetocin
		"H02":     {span{"0.5", "150"}, span{"0.02", "30"}, span{"0.03", "1"}},
		"J01":     {span{"3", "400"}, span{"0.2", "100"}, span{"2", "50"}},
		"M01":     {span{"6", "100"}, span{"0.05", "2"}, none},
		"M03C":    {span{"0.1", "20"}, span{"0.3", "10"}, none},
		"N02B":    {span{"3", "30"}, span{"2", "50"}, none},
		"N03":     {span{"1.5", "600"}, span{"1", "200"}, span{"1", "250"}},
		"N05A":    {span{"1.5", "15"}, span{"0.003", "0.5"}, none},
		"N05CM":   {span{"0.001", "0.3"}, none, span{"0.00006", "0.005"}}, // dexmedetomidine
		"R03C":    {span{"0.15", "3"}, span{"0.001", "0.03"}, span{"0.0004", "0.12"}},
		"R03D":    {span{"8", "80"}, span{"1.5", "20"}, span{"0.15", "60"}},
		"V03AB17": {span{"1.5", "30"}, span{"0.1", "6"}, none}, // methylthioninium
		"V03AB19": {span{"0.1", "3"}, span{"0.003", "0.1"}, none},
	}
}

func unitGroups() map[string]size {
	return map[string]size{
		"A10":   {span{"30", "300"}, none, span{"0.01", "0.5"}},
		"B01":   {span{"15", "80000"}, span{"15", "500"}, span{"4", "100"}},
		"H01BA": {span{"0.06", "60"}, none, span{"0.003", "0.3"}},
		"H01BB": {span{"1.5", "30"}, span{"0.008", "0.3"}, span{"0.0003", "0.4"}},
	}
}

func substanceGroups() map[string]size {
	return map[string]size{
		"B05XA01": {span{"0.005", "6"}, none, span{"0.02", "1"}}, // potassium
		"B05XA02": {span{"0.05", "3"}, span{"0.2", "4"}, span{"0.08", "4"}},
		"B05XA07": {span{"0.2", "3"}, span{"0.01", "0.5"}, span{"0.04", "0.5"}}, // calcium
	}
}
