package dilution_test

import (
	"fmt"
	"strings"
	"testing"

	"drawup/dilution"
	"drawup/dilution/formulary"
	"drawup/dilution/order"
	"drawup/dilution/refusal"
)

// What a refusal offers in place of the order can be ordered: the lines that it
// names, written into the order, give a syringe that is made, with the figures
// that the refusal stated.
func TestInsteadCanBeOrdered(t *testing.T) {
	f := starter(t)
	offered := 0
	for name, text := range refusedTexts(t) {
		b := benchFor(t, name)
		form := formularyFor(t, name, f)
		o, faults := order.Read("order.toml", []byte(text))
		_, list := b.NewList(o, form, o.Session.Prepared.Value, nil, faults)
		for _, r := range list.Refusals() {
			if r.Instead == nil {
				continue
			}
			offered++
			if len(r.Instead.Write) == 0 || r.Remedy != r.Instead.Says {
				t.Errorf("%s, syringe %d: got nothing to write in %+v", name, r.Syringe, r.Instead)
			}
			p := rewritten(t, b, form, text, o.Syringes[r.Syringe-1], r.Instead)
			if p == nil {
				t.Errorf("%s, syringe %d, %s: writing %v does not give a syringe that can be made", name, r.Syringe, r.Code, r.Instead.Write)
				continue
			}
			compareInstead(t, fmt.Sprintf("%s, syringe %d", name, r.Syringe), *p, r.Instead)
		}
	}
	if offered < 8 {
		t.Errorf("got %d alternatives, want enough to mean something", offered)
	}
}

// rewritten plans the one syringe with the lines written into its table; nil when
// it is refused.
func rewritten(t *testing.T, b bench, f *formulary.Formulary, text string, s order.Syringe, in *refusal.Instead) *dilution.Plan {
	t.Helper()
	all := strings.Split(text, "\n")
	var table []string
	for i := s.Pos.Line; i < len(all) && !strings.HasPrefix(strings.TrimSpace(all[i]), "["); i++ {
		table = append(table, all[i])
	}
	for _, l := range in.TakeOut {
		table = without(table, l)
	}
	for _, l := range in.Write {
		value := fmt.Sprintf("%s = %q", l.Key, l.Value)
		table = append(without(table, l.Key), value)
	}
	head := strings.Join(all[:s.Pos.Line], "\n")
	at := strings.LastIndex(head, "[[patient]]")
	patient := head[at:]
	if next := strings.Index(patient, "[[patient."); next >= 0 {
		patient = patient[:next]
	}
	before := text[:strings.Index(text, "[[patient]]")]
	body := before + patient + "\n" + strings.TrimSpace(all[s.Pos.Line-1][:strings.Index(all[s.Pos.Line-1], "]]")+2]) + "\n" + strings.Join(table, "\n")
	fresh := b
	if b.Shelf != nil { // what other syringes of the file open stays on the shelf here
		shelf := *b.Shelf
		fresh.Shelf = &shelf
	}
	o, faults := order.Read("order.toml", []byte(body))
	list, reasons := fresh.NewList(o, f, o.Session.Prepared.Value, nil, faults)
	if reasons.Refused() || len(list.Plans) != 1 {
		t.Logf("%v\n%s", reasons.Refusals(), body)
		return nil
	}
	return &list.Plans[0]
}

// without is the lines of a table less the one of a key.
func without(table []string, name string) []string {
	var kept []string
	for _, line := range table {
		if k, _, _ := strings.Cut(line, "="); strings.TrimSpace(k) != name {
			kept = append(kept, line)
		}
	}
	return kept
}

func compareInstead(t *testing.T, what string, p dilution.Plan, in *refusal.Instead) {
	t.Helper()
	m, s := p.Mixture, p.Style
	want(t, what+": presentation", p.Presentation.ID, in.Presentation)
	want(t, what+": containers", fmt.Sprint(m.Containers), fmt.Sprint(in.Containers))
	want(t, what+": drawn", s.Volume(m.DrugVolume), in.DrugVolume.Printed)
	want(t, what+": with", s.Volume(m.DrugReading.Barrel.Nominal()), in.MeasuringSyringe.Printed)
	want(t, what+": in all", s.Volume(m.FinalVolume), in.FinalVolume.Printed)
	want(t, what+": concentration", s.Concentration(m.Concentration), in.Concentration.Printed)
	if p.Dose != nil {
		want(t, what+": dose", s.Volume(p.Dose.Volume), in.DoseVolume.Printed)
	}
	if p.Infusion != nil {
		want(t, what+": rate", s.FlowRate(p.Infusion.Start.Rate), in.PumpRate.Printed)
	}
}
