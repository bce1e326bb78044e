package recheck

import (
	"strings"
	"testing"
)

const otherRecord = `[[drug]]
name = "second invented"
also = ["deuterin"]
[[drug.presentation]]
id = "b"
amount = "600 microgram"
volume = "3 mL"
[[drug.presentation]]
id = "powder"
amount = "600 microgram"
add = "2.9 mL"
displacement = "0.1 mL"
`

// pairRecord's figure is chosen so that nothing else holds it.
const pairRecord = `[sources]
[[mix]]
drugs = ["invented", "third"]
note = [ { text = "Within 77 min." } ]
[[mix]]
drugs = ["second invented", "invented"]
most = { value = "0.2 mg per 1 mg", source = "INV" }
note = [
  { text = "Not more than 31 h.", source = "INV" },
]
[[never_mix]]
drugs = ["second invented", "invented"]
reason = "after 78 min"
`

// twoDrugs is invented: 5 mg of 2.5 mg/mL are 2 mL; 1 mg of a second drug of
// 200 micrograms/mL 5 mL, of two containers of 3 mL; both made up to 10 mL.
func twoDrugs(t testing.TB) Stated {
	t.Helper()
	s := stated(t, "amount = \"2.5 mg\"\nvolume = \"1 mL\"\nassay = \"5 %\"\n",
		siteBarrels+"final.barrel = 10 mL\nmethod = make up to\namount = 5 mg\nfinal.volume = 10 mL\nother.drug = Deuterin\nother.amount = 1 mg",
		`container.amount = 2.5 mg
container.volume = 1 mL
container.count = 2
strength = 2.5 mg/mL
method = make up to
drug.volume = 2 mL
drug.step = 0.1 mL
drug.barrel = 2 mL
other.drug = second invented
other.container.amount = 600 micrograms
other.container.volume = 3 mL
other.container.count = 2
other.strength = 200 micrograms/mL
other.volume = 5 mL
other.step = 0.2 mL
other.barrel = 5 mL
other.amount = 1 mg
other.left.volume = 1 mL
other.left.amount = 200 micrograms
second.amount = 1 mg
second.concentration = 100 micrograms/mL
diluent.volume = 3 mL
final.volume = 10 mL
final.barrel = 10 mL
left.volume = 0 mL
amount = 5 mg
concentration = 500 micrograms/mL
assay = 5 %`)
	s.OtherDrug, s.OtherPresentation, s.OtherRecord, s.PairRecord = "second invented", "b", []byte(otherRecord), []byte(pairRecord)
	return s
}

func TestTwoDrugs(t *testing.T) {
	s := twoDrugs(t)
	agrees(t, "two drugs", s)
	for _, r := range []struct{ what, name, text, at string }{
		{"the first drug's name", OtherDrug, "invented", OtherDrug},
		{"a name nobody typed", OtherDrug, "deuterin", OtherDrug},
		{"the first drug's strength", OtherStrength, "2.5 mg/mL", OtherStrength},
		{"no room for the second drug", FinalVolume, "5 mL", FinalVolume},
		{"diluent as if there were no second drug", DiluentVolume, "8 mL", DiluentVolume},
		{"neat", Method, "neat", Method},
		{"off its graduation", OtherVolume, "5.1 mL", OtherVolume},
		{"barrel too small", OtherBarrel, "3 mL", OtherBarrel},
		{"graduation of another barrel", OtherStep, "0.1 mL", OtherStep},
		{"one container too few", OtherContainerCount, "1", OtherContainerCount},
	} {
		disagreesAt(t, r.what, s.with(r.name, r.text), r.at)
	}
	more := s.with(OtherContainerCount, "3").without(OtherLeftVolume).without(OtherLeftAmount)
	disagreesAt(t, "one container too many", more, OtherContainerCount)
}

// The second drug's figures come from its own record, and none is assumed.
func TestTwoDrugsNeedBothRecords(t *testing.T) {
	s := twoDrugs(t)
	for what, change := range map[string]func(*Stated){
		"no second record":       func(s *Stated) { s.OtherRecord = nil },
		"the first drug's":       func(s *Stated) { s.OtherRecord = s.Record },
		"another presentation":   func(s *Stated) { s.OtherPresentation = "c" },
		"no second drug stated":  func(s *Stated) { s.OtherDrug = "" },
		"the same drug twice":    func(s *Stated) { s.OtherDrug, s.OtherPresentation, s.OtherRecord = s.Drug, s.Presentation, s.Record },
		"a name twice in a file": func(s *Stated) { s.OtherRecord = []byte(otherRecord + otherRecord) },
	} {
		changed := s
		change(&changed)
		disagreesAt(t, what, changed, OtherDrug)
	}
	unasked := s
	unasked.Asked = list(t, "order", siteBarrels+"final.barrel = 10 mL\nmethod = make up to\namount = 5 mg\nfinal.volume = 10 mL\nother.amount = 1 mg")
	disagreesAt(t, "nobody asked for it", unasked, OtherDrug)
	powder := s
	powder.OtherPresentation = "powder"
	agrees(t, "a powder of 2.9 mL and 0.1 mL", powder)
	first := s
	for _, name := range []string{OtherDrug, OtherContainerAmount, OtherContainerVolume, OtherContainerCount, OtherStrength, OtherVolume, OtherStep, OtherBarrel, OtherAmount, OtherLeftVolume, OtherLeftAmount, SecondAmount, SecondConcentrated} {
		first = first.without(name)
	}
	disagreesAt(t, "a second drug that no paper names", first, FinalVolume)
	first.OtherDrug, first.Asked = "", unasked.Asked
	disagreesAt(t, "8 mL of diluent for 3 mL", first, FinalVolume)
}

// How much of the second drug the order may say. Invented: 0.1 mg/mL in 10 mL of
// 200 micrograms/mL are 5 mL; two whole containers 6 mL.
func TestSecondDrugAsOrdered(t *testing.T) {
	asked := func(s Stated, lines string) Stated {
		s.Asked = list(t, "order", siteBarrels+"final.barrel = 10 mL\nmethod = make up to\namount = 5 mg\nfinal.volume = 10 mL\nother.drug = second invented\n"+lines)
		return s
	}
	s := twoDrugs(t)
	agrees(t, "second.amount", asked(s, "second.amount = 1 mg"))
	agrees(t, "half a graduation less", asked(s, "second.amount = 0.98 mg"))
	agrees(t, "second.concentration", asked(s, "second.concentration = 0.1 mg/mL"))
	agrees(t, "other.volume", asked(s, "other.volume = 5 mL"))
	disagreesAt(t, "half a graduation more", asked(s, "second.amount = 1.02 mg"), OtherVolume)
	disagreesAt(t, "tenfold", asked(s, "other.amount = 10 mg"), OtherVolume)
	disagreesAt(t, "micrograms", asked(s, "other.amount = 1 microgram"), OtherVolume)
	disagreesAt(t, "units", asked(s, "other.amount = 1 unit"), OtherVolume)
	disagreesAt(t, "another volume", asked(s, "other.volume = 5.2 mL"), OtherVolume)
	disagreesAt(t, "two things that do not fit", asked(s, "other.amount = 1 mg\nsecond.concentration = 0.2 mg/mL"), OtherVolume)
	disagreesAt(t, "nothing", asked(s, ""), OtherVolume)
	whole := s.with(OtherVolume, "6 mL").with(OtherAmount, "1.2 mg").with(SecondAmount, "1.2 mg").with(SecondConcentrated, "120 micrograms/mL").
		with(OtherLeftVolume, "0 mL").with(OtherLeftAmount, "0 mg").with(DiluentVolume, "2 mL").with(OtherBarrel, "10 mL").with(OtherStep, "0.5 mL")
	agrees(t, "whole containers", asked(whole, "other.container.count = 2"))
	disagreesAt(t, "other whole containers", asked(whole, "other.container.count = 3"), OtherContainerCount)
	disagreesAt(t, "a part of them", asked(s, "other.container.count = 2"), OtherVolume)
}

// Two drugs drawn together without diluent; two added to a bag of 20 mL. Invented:
// 0.5 mg/mL beside 5 mL and 20 mL want d (2.5 - 0.5) = 0.5 x 25, d = 6.25 mL, 6.2 mL
// on 0.2 mL; 0.04 mg/mL beside 20 mL and 6.2 mL want d (0.2 - 0.04) = 0.04 x 26.2,
// d = 6.55 mL, 6.6 mL.
func TestTwoDrugsNeatAndAdded(t *testing.T) {
	s := twoDrugs(t).without(DiluentVolume).with(Method, "neat").with(FinalVolume, "7 mL").with(Concentration, "714 micrograms/mL").with(SecondConcentrated, "143 micrograms/mL")
	s.Asked = list(t, "order", siteBarrels+"final.barrel = 10 mL\nmethod = neat\nfinal.volume = 7 mL\nother.drug = second invented\nother.amount = 1 mg")
	agrees(t, "neat", s)
	disagreesAt(t, "more than both", s.with(FinalVolume, "8 mL"), FinalVolume)
	disagreesAt(t, "another volume of the second", s.with(OtherVolume, "4.8 mL"), OtherVolume, FinalVolume, DrugVolume)
	build := func(drug, other, final, conc, second string) Stated {
		b := stated(t, "amount = \"25 mg\"\nvolume = \"10 mL\"\n", "drug.step = 0.2 mL\ndrug.barrel = 10 mL\nmethod = add to\nconcentration = 0.5 mg/mL\ndiluent.volume = 20 mL\nother.drug = second invented\n"+second,
			"container.amount = 25 mg\ncontainer.volume = 10 mL\nmethod = add to\ndrug.step = 0.2 mL\nother.step = 0.2 mL\nother.barrel = 10 mL\ndiluent.volume = 20 mL\nother.container.amount = 600 micrograms\nother.container.volume = 3 mL\nother.drug = second invented\n"+
				"drug.volume = "+drug+"\nother.volume = "+other+"\nfinal.volume = "+final+"\nconcentration = "+conc)
		b.OtherDrug, b.OtherPresentation, b.OtherRecord = "second invented", "b", []byte(otherRecord)
		return b
	}
	agrees(t, "added", build("6.2 mL", "5 mL", "31.2 mL", "497 micrograms/mL", "other.volume = 5 mL"))
	disagreesAt(t, "a graduation less", build("6 mL", "5 mL", "31 mL", "484 micrograms/mL", "other.volume = 5 mL"), DrugVolume)
	agrees(t, "second added", build("6.6 mL", "6.6 mL", "33.2 mL", "497 micrograms/mL", "second.concentration = 0.04 mg/mL"))
	disagreesAt(t, "second, a graduation more", build("6.8 mL", "7 mL", "33.8 mL", "503 micrograms/mL", "second.concentration = 0.04 mg/mL"), OtherVolume)
}

// Calculation notes, part g: 1 mL in a 2 mL barrel (5 %) with 9 mL added in a 10 mL
// barrel (4 %), ampoule 5 %: u = 4.40 %; twice that, 8.8 %, is printed.
func TestIntervalOfTwoDrawnTogether(t *testing.T) {
	s := stated(t, "amount = \"100 mg\"\nvolume = \"10 mL\"\nassay = \"5 %\"\n", siteBarrels+"method = neat\nfinal.volume = 10 mL\nother.drug = second invented\nother.volume = 9 mL", `container.amount = 100 mg
container.volume = 10 mL
method = neat
drug.volume = 1 mL
drug.step = 0.1 mL
drug.barrel = 2 mL
other.drug = second invented
other.volume = 9 mL
other.step = 0.5 mL
other.barrel = 10 mL
final.volume = 10 mL
concentration = 1 mg/mL
assay = 5 %
interval.percent = 8.8 %
interval.low = 0.912 mg/mL
interval.high = 1.088 mg/mL`)
	s.OtherDrug, s.OtherPresentation, s.OtherRecord = "second invented", "b", []byte(otherRecord)
	agrees(t, "part g", s)
	disagreesAt(t, "the assay alone, as for one neat drug", s.with(IntervalPercent, "5 %"), IntervalPercent)
	disagreesAt(t, "no barrel of the second", s.without(OtherBarrel), IntervalPercent)
}

// Sentences and bounds may repeat what the second drug's block and the pair's own
// say, and nothing of other pairs.
func TestSentencesOfTwoDrugs(t *testing.T) {
	said1 := Row(Said, 1, "text")
	for text, want := range map[string]bool{
		"Not more than 31 h.": true, "0.2 mg per 1 mg": true, "3 mL of 600 micrograms": true, "within 31 h": true,
		"Not more than 32 h.": false, "0.3 mg per 1 mg": false, "within 77 min": false, "after 78 min": false,
	} {
		s := twoDrugs(t)
		for _, name := range []string{said1, Row(Bound, 1, "text")} {
			s.Figures = append(s.Figures, Figure{"draw-up", name, text})
		}
		if want {
			agrees(t, text, s)
		} else {
			disagreesAt(t, text, s, said1, Row(Bound, 1, "text"))
		}
	}
	s := twoDrugs(t)
	s.PairRecord = nil
	s.Record = append(s.Record, pairRecord...)
	s.Figures = append(s.Figures, Figure{"draw-up", said1, "Not more than 31 h."})
	agrees(t, "the pair in the drug's own file", s)
	s.OtherDrug = "nobody"
	disagreesAt(t, "a pair of nobody", s, said1)
}

// A site's product number stands for the first drug, never for the second.
func TestProductOfTwoDrugs(t *testing.T) {
	c := newCheck(twoDrugs(t))
	block := c.blockTexts()
	if names := strings.Join(block.texts[:block.own], " "); strings.Contains(names, "second") || strings.Contains(names, "deuterin") {
		t.Errorf("the drug's own names hold those of the second: %q", names)
	}
}

// A second drug of the same container and one of another cannot be told apart.
func TestThreeDrugs(t *testing.T) {
	s := twoDrugs(t)
	s.Record = append(s.Record, "second_amount = \"1 mg\"\n"...)
	s.Figures = append(s.Figures, Figure{"draw-up", SecondContainer, "1 mg"})
	disagreesAt(t, "three drugs", s, SecondContainer)
}
