package main

import (
	"bytes"
	"encoding/json"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// TestAnyRequest types flags with plausible and broken texts at random and
// wants an answer or a refusal each time: no crash, a document that reads, and
// results only when nothing refuses.
func TestAnyRequest(t *testing.T) {
	specs := map[string][]flagSpec{"rate": rateFlags(), "dose": doseFlags(), "mix": mixFlags(), "body": bodyFlags(), "convert": convertFlags(),
		"flow": flowFlags(), "total": totalFlags(), "local": localFlags(), "accuracy": accuracyFlags()}
	numbers := []string{"0.1", "4", "50", "250", "0.003", "72", "178", "1000000", "0", "-1", "1,5", ".5", "1e3", ""}
	units := []string{" mg", " mL", " mL/h", " mg/mL", " microgram/kg/min", " mg/kg", " mg/m2", " kg", " cm", " m2", " units", " units/mL",
		" mmol", " mmol/mL", " mEq", " mEq/L", " %", " years", " mg in 50 mL", " units/kg/h", "", " base", " mg base", " \x1b[0m",
		" h", " min", ":30", " drops/mL", " drops/min", " mL/kg/h", " pounds", " lb", " feet 7 inches", " stone 4", " mL, 5 %"}
	words := []string{"male", "mmol", "mg", "mg base", "mmol/mL", "microgram/kg/min", "sodium chloride", "calcium in calcium chloride dihydrate",
		"ketamine hydrochloride", "1:1000", "kg", "\xff\xfe", "all", "APLS 2011", "three", "du bois", "bolus", "infusion", "noradrenaline", "vial 500 mg", "lidocaine 1 %, 5 mL", "mobile"}
	rapid.Check(t, func(t *rapid.T) {
		name := rapid.SampledFrom([]string{"rate", "dose", "mix", "body", "convert", "flow", "total", "local", "accuracy"}).Draw(t, "command")
		args := []string{name, "--json"}
		most := rapid.SampledFrom([]int{4, 12}).Draw(t, "few flags or many")
		for _, f := range specs[name] {
			switch rapid.IntRange(0, most).Draw(t, f.name) {
			case 0:
				args = append(args, "--"+f.name, rapid.SampledFrom(numbers).Draw(t, "number")+rapid.SampledFrom(units).Draw(t, "unit"))
			case 1:
				args = append(args, "--"+f.name, rapid.SampledFrom(words).Draw(t, "word"))
			case 2, 5, 6:
				args = append(args, "--"+f.name, f.example)
			}
		}
		var out, faults bytes.Buffer
		code := run(args, strings.NewReader(""), &out, &faults)
		var doc findings
		if err := json.Unmarshal(out.Bytes(), &doc); err != nil {
			t.Fatalf("%q: %v", args, err)
		}
		switch code {
		case exitMade:
			if len(doc.Refusals) != 0 || faults.Len() != 0 {
				t.Fatalf("%q: made with refusals: %s", args, faults.String())
			}
		case exitRefused, exitUnreadable:
			if len(doc.Refusals) == 0 || strings.Contains(out.String(), `"exact"`) {
				t.Fatalf("%q: exit %d: %s", args, code, out.String())
			}
		default:
			t.Fatalf("%q: got exit %d", args, code)
		}
		if strings.ContainsRune(faults.String(), 0x1b) {
			t.Fatalf("%q: an escape reached the terminal", args)
		}
	})
}
