package dilution_test

import (
	"slices"
	"strings"
	"testing"

	"drawup/dilution"
	"drawup/dilution/order"
	"drawup/dilution/refusal"
)

// barrels are the usual syringes of a shelf.
const barrels = "[[barrel]]\nsize = \"1 mL\"\n[[barrel]]\nsize = \"2 mL\"\n[[barrel]]\nsize = \"5 mL\"\n[[barrel]]\nsize = \"10 mL\"\n" +
	"[[barrel]]\nsize = \"20 mL\"\n[[barrel]]\nsize = \"50 mL\"\n"

// stocked is one entry of a shelf; count is left out when it is "".
func stocked(drug, presentation, count string) string {
	text := "[[stock]]\n" + lines(key("drug", drug), key("presentation", presentation))
	if count != "" {
		text += "count = " + count + "\n"
	}
	return text
}

// fromShelf plans an order of an adult from a shelf.
func fromShelf(t testing.TB, shelfText, orderText string) (dilution.List, refusal.List) {
	t.Helper()
	s := shelf(t, shelfText)
	return bench{dilution.Bench{Shelf: &s, Explain: true}}.plan(t, starter(t), session+adult+orderText)
}

// made plans one syringe from a shelf and demands that it is made.
func made(t testing.TB, shelfText, table, body string) dilution.Plan {
	t.Helper()
	list, reasons := fromShelf(t, shelfText, "[[patient."+table+"]]\n"+body)
	if reasons.Refused() || len(list.Plans) != 1 {
		t.Fatalf("refused:\n%v", reasons.Refusals())
	}
	return list.Plans[0]
}

// opened is what is opened, "1 x ampoule 4 mg in 4 mL".
func opened(p dilution.Plan) string {
	for _, c := range p.Choices {
		if c.What == "containers" {
			return strings.ReplaceAll(c.Took, `"`, "")
		}
	}
	return ""
}

// The rule of choice, by hand: a line and a fifth of the barrel first, then fewest
// containers, least left over, fewest sizes, fewest acts, the place on the shelf.
func TestChoiceOfPresentation(t *testing.T) {
	fentanyl := func(counts ...string) string {
		text := barrels
		for i, p := range []string{"ampoule 100 microgram in 2 mL", "ampoule 500 microgram in 10 mL", "vial 250 microgram in 5 mL", "vial 1000 microgram in 20 mL"} {
			if counts[i] != "0" {
				text += stocked("fentanyl", p, counts[i])
			}
		}
		return text
	}
	for _, c := range []struct{ name, shelf, body, opens string }{
		{"two sizes of one strength, nothing left", fentanyl("", "", "0", "0"), key("amount", "600 microgram"),
			"1 x ampoule 100 microgram in 2 mL and 1 x ampoule 500 microgram in 10 mL"},
		{"one container before two that leave less", fentanyl("", "", "0", "0"), key("amount", "150 microgram"), "1 x ampoule 500 microgram in 10 mL"},
		{"one container that leaves less", fentanyl("", "", "", "0"), key("amount", "150 microgram"), "1 x vial 250 microgram in 5 mL"},
		{"the shelf has too few of the large ones", fentanyl("", "1", "0", "0"), key("amount", "800 microgram"),
			"3 x ampoule 100 microgram in 2 mL and 1 x ampoule 500 microgram in 10 mL"},
		{"a solution that is ready before one to dilute", barrels + stocked("ephedrine", "ampoule 30 mg in 1 mL", "") + stocked("ephedrine", "syringe 30 mg in 10 mL", ""),
			lines(key("concentration", "3 mg/mL"), key("volume", "10 mL")), "1 x syringe 30 mg in 10 mL"},
		{"all else equal, the first on the shelf", barrels + stocked("ondansetron", "vial 4 mg in 2 mL", "") + stocked("ondansetron", "ampoule 4 mg in 2 mL", ""),
			key("amount", "4 mg"), "1 x vial 4 mg in 2 mL"},
		// 0.1 mL of 50 mg/mL is under a fifth of 1 mL; 0.5 mL of 10 mg/mL is not.
		{"a volume that a barrel shows well before the stronger one", barrels + stocked("ketamine", "ampoule 100 mg in 2 mL", "") + stocked("ketamine", "ampoule 20 mg in 2 mL", ""),
			key("amount", "5 mg"), "1 x ampoule 20 mg in 2 mL"},
	} {
		drug := map[bool]string{true: "fentanyl", false: ""}[strings.Contains(c.shelf, "fentanyl")]
		for _, d := range []string{"ephedrine", "ondansetron", "ketamine"} {
			if strings.Contains(c.shelf, d) {
				drug = d
			}
		}
		p := made(t, c.shelf, "syringe", key("drug", drug)+"\n"+c.body+"\n")
		want(t, c.name, opened(p), c.opens)
		if !p.FromShelf || len(p.Choices) < 4 {
			t.Errorf("%s: got choices %+v", c.name, p.Choices)
		}
		for _, x := range p.Choices {
			if x.Took == "" || x.Why == "" {
				t.Errorf("%s: a choice without a reason: %+v", c.name, x)
			}
		}
	}
}

// What one syringe opens is gone for the next; a syringe that is refused opens
// nothing.
func TestShelfRunsDown(t *testing.T) {
	text := barrels + stocked("etomidate", "ampoule 20 mg in 10 mL", "3") + stocked("suxamethonium", "ampoule 100 mg in 2 mL", "1")
	wanted := "[[patient.syringe]]\n" + lines(key("drug", "etomidate"), key("amount", "40 mg")) +
		"[[patient.syringe]]\n" + lines(key("drug", "suxamethonium"), key("dose", "10 mg/kg")) + // refused: ten times too much
		"[[patient.syringe]]\n" + lines(key("drug", "etomidate"), key("amount", "20 mg")) +
		"[[patient.syringe]]\n" + lines(key("drug", "suxamethonium"), key("dose", "1 mg/kg")) +
		"[[patient.syringe]]\n" + lines(key("drug", "etomidate"), key("amount", "20 mg"))
	_, reasons := fromShelf(t, text, wanted)
	if got := reasons.Of(5).Refusals().Codes(); !slices.Equal(got, []refusal.Code{refusal.StockShort}) {
		t.Errorf("the fourth ampoule of three: got %v", got)
	}
	for _, n := range []int{1, 3, 4} {
		if got := reasons.Of(n).Refusals(); len(got) > 0 {
			t.Errorf("syringe %d: got %v, want it made", n, got)
		}
	}
}

// A label printed by itself comes from the same containers as in the list: what
// the syringes before it open is gone, also when they are left out.
func TestLeftOutSyringesKeepTheirContainers(t *testing.T) {
	s := shelf(t, barrels+stocked("ondansetron", "vial 4 mg in 2 mL", "1")+stocked("ondansetron", "ampoule 4 mg in 2 mL", ""))
	text := session + adult + strings.Repeat("[[patient.syringe]]\n"+lines(key("drug", "ondansetron"), key("amount", "4 mg")), 2)
	o, faults := order.Read("order.toml", []byte(text))
	both, _ := dilution.Bench{Shelf: &s}.NewList(o, starter(t), o.Session.Prepared.Value, nil, faults)
	alone, reasons := dilution.Bench{Shelf: &s}.NewList(o, starter(t), o.Session.Prepared.Value, map[int]bool{1: true}, faults)
	if reasons.Refused() || len(both.Plans) != 2 || len(alone.Plans) != 1 {
		t.Fatal(reasons)
	}
	want(t, "in the list", both.Plans[1].Presentation.ID, "ampoule 4 mg in 2 mL")
	want(t, "alone", alone.Plans[0].Presentation.ID, "ampoule 4 mg in 2 mL")
}

// The giving syringe fits a pump on the list; the diluent comes from fewest
// containers, then those that leave least; a bag must be there in its size. By
// hand: 50 mL less 10 mL are 40 mL, four ampoules of 10 mL or one bag.
func TestChoiceOfPumpAndFluid(t *testing.T) {
	stock := barrels + stocked("midazolam", "ampoule 50 mg in 10 mL", "")
	saline := func(container, volume string) string {
		return "[[diluent]]\n" + lines(key("name", "sodium chloride 0.9 %"), key("container", container), key("volume", volume))
	}
	pump := func(sizes string) string {
		return "[[pump]]\nname = \"the pump\"\ntakes = [" + sizes + "]\n"
	}
	infusion := func(mix string) string {
		return lines(key("drug", "midazolam"), key("mix", mix), key("start", "0.05 mg/kg/h"))
	}
	p := made(t, stock+saline("ampoule", "10 mL")+pump(`"50 mL"`), "infusion", infusion("20 mg in 20 mL"))
	want(t, "a pump for 50 mL only", p.Mixture.FinalBarrel.Nominal().Exact(), "50")
	want(t, "the only fluid on the shelf", p.Mixture.Diluent, "sodium chloride 0.9 %")
	p = made(t, stock+saline("ampoule", "10 mL")+pump(`"20 mL", "50 mL"`), "infusion", infusion("20 mg in 20 mL"))
	want(t, "a pump for 20 mL as well", p.Mixture.FinalBarrel.Nominal().Exact(), "20")
	for _, c := range []struct{ shelf, container, volume string }{
		{saline("ampoule", "10 mL"), "ampoule", "10"},
		{saline("ampoule", "10 mL") + saline("bag", "100 mL"), "bag", "100"},
		{saline("bag", "100 mL") + saline("bag", "50 mL"), "bag", "50"},
	} {
		p := made(t, stock+c.shelf, "infusion", infusion("50 mg in 50 mL"))
		f := p.Mixture.Fluids
		if len(f) != 1 || f[0].Container != c.container || f[0].Volume.Exact() != c.volume {
			t.Errorf("got %+v, want a %s of %s mL", f, c.container, c.volume)
		}
	}
	bag := infusion("100 mg in 100 mL") + lines(key("method", "add to"))
	if p := made(t, stock+saline("bag", "100 mL"), "infusion", bag); len(p.Mixture.Fluids) != 1 || !p.Mixture.InBag {
		t.Errorf("got %+v, want the bag", p.Mixture.Fluids)
	}
	_, reasons := fromShelf(t, stock+saline("bag", "250 mL"), "[[patient.infusion]]\n"+bag)
	if got := reasons.Refusals().Codes(); !slices.Equal(got, []refusal.Code{refusal.DiluentNotStocked}) {
		t.Errorf("a bag of another size: got %v", got)
	}
}

// Barrels of the site's own, with its own graduations: 4.6 mL stands on a line of
// the 10 mL barrel in 0.2 mL and not on that of the 5 mL barrel in 0.5 mL.
func TestChoiceOfBarrel(t *testing.T) {
	own := "[[barrel]]\nsize = \"5 mL\"\nstep = \"0.5 mL\"\n[[barrel]]\nsize = \"10 mL\"\nstep = \"0.2 mL\"\n[[barrel]]\nsize = \"50 mL\"\n"
	p := made(t, own+stocked("etomidate", "ampoule 20 mg in 10 mL", ""), "syringe", lines(key("drug", "etomidate"), key("amount", "9.2 mg")))
	want(t, "drawn", p.Mixture.DrugVolume.Exact()+" on "+p.Mixture.DrugReading.Barrel.Nominal().Exact(), "4.6 on 10")
	want(t, "given from", p.Mixture.FinalBarrel.Nominal().Exact(), "10")
	// The order's list narrows the shelf's.
	s := shelf(t, own+stocked("etomidate", "ampoule 20 mg in 10 mL", ""))
	_, reasons := bench{dilution.Bench{Shelf: &s}}.plan(t, starter(t), session+"[site]\nbarrels = [\"10 mL\", \"20 mL\"]\n"+adult+
		"[[patient.syringe]]\n"+lines(key("drug", "etomidate"), key("amount", "20 mg")))
	if got := reasons.Refusals().Codes(); !slices.Equal(got, []refusal.Code{refusal.SyringeUnknown}) {
		t.Errorf("a barrel that the shelf lacks: got %v", got)
	}
}

// The fluid for a powder is measured in a syringe that has a line there: 2 mL for
// each vial of 2 mg remifentanil (the starter's record), which a shelf with a 50 mL
// syringe in steps of 5 mL alone cannot show.
func TestChoiceForPowder(t *testing.T) {
	body := lines(key("drug", "remifentanil"), key("mix", "2 mg in 40 mL"), key("diluent", "sodium chloride 0.9 %"), key("start", "0.1 microgram/kg/min"))
	p := made(t, barrels+stocked("remifentanil", "vial 2 mg", ""), "infusion", body)
	want(t, "for the powder", p.Mixture.AddBarrel.Nominal().Exact(), "2")
	coarse := "[[barrel]]\nsize = \"50 mL\"\nstep = \"5 mL\"\n" + stocked("remifentanil", "vial 2 mg", "")
	_, reasons := fromShelf(t, coarse, "[[patient.infusion]]\n"+body)
	if !slices.Contains(reasons.Refusals().Codes(), refusal.VolumeOffGraduation) {
		t.Errorf("got %v", reasons.Refusals())
	}
}

// More ways than are looked at are cut, and the plan says so.
func TestSearchIsBounded(t *testing.T) {
	f := inventedFormulary(t, 1, 70, 1)
	s := shelfOf(t, f)
	list, reasons := bench{dilution.Bench{Shelf: &s}}.plan(t, f, session+adult+"[[patient.syringe]]\n"+lines(key("drug", "drug aa"), key("amount", "30 mg")))
	if reasons.Refused() || !slices.Contains(reasons.Cautions().Codes(), refusal.SearchCut) || len(list.Plans) != 1 {
		t.Errorf("got %v", reasons)
	}
}
