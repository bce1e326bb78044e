package main

import (
	"fmt"
	"strings"

	"drawup/dilution/refusal"
)

// A topic is one page of help that is not a command.
type topic struct{ name, summary, text string }

func topics() []topic {
	return []topic{
		{"quantities", "how to type amounts, volumes, rates", helpQuantities},
		{"rounding", "where numbers are rounded and where not", helpRounding},
		{"exit-codes", "what the program ends with", helpExitCodes},
		{"cautions", "refusals and cautions, and how to read them", helpCautions},
		{"shelf", "a file of what is stocked, and how the planner chooses from it", helpShelf},
	}
}

const helpQuantities = `Quantities are typed as people write them, in quotes: a number, a blank, a unit.

  amount         4 mg   500 units   8 mmol   150 micromol   200 ng
  volume         50 mL   1 L
  concentration  2 mg/mL   200 mg/5 mL   4 mg in 50 mL   0.5 %   1:1000
  dose           2 mg   0.3 mg/kg   75 mg/m2
  dose rate      5 mg/h   0.1 microgram/kg/min   2 units/day
  flow rate      5.3 mL/h   0.5 mL/min   2 mL/kg/h
  time           6 h   90 min   1 h 30 min   2 days
  drops          42 drops/min   20 drops/mL
  patient        72 kg   178 cm   1.8 m2   54 years

In quick sums a weight or height may be in words, "165 pounds", "11 stone 4 pounds",
"5 feet 7 inches"; lb, st, ft and in are refused. Order files take kg and cm.

microgram may be typed as mcg or µg. Per cent (grams in 100 mL) and ratio
strengths are read and never printed. A number has digits and at most one point
with digits on both sides: 0.5, not .5 or 0,5 or 5e-1. What is refused comes
with the reading that was probably meant.

"4 mg in 50 mL" means 50 mL in the end, drug included.
`

const helpRounding = `Every sum is worked in exact fractions. A number is rounded where it meets a
scale, once, half up:

  pump rate        to the pump's step, 0.1 mL/h unless --step says otherwise
  body weight      ideal, adjusted and lean weight to 0.1 kg
  surface area     to 0.01 m²
  drops            to whole drops a minute
  time, and the most of a local anaesthetic
                   down, to whole minutes and to 0.1 mL
  on screen        exactly, where four digits are enough; else to three digits,
                   and "about" stands before it

With --json each quantity has "exact": the full decimal if it ends, else a
fraction such as 28/3.
`

const helpExitCodes = `0  made: the result is there
1  refused: a rule, a limit, a number or a unit stands against it
2  the request cannot be read: a flag is wrong or missing, or a file is not one
3  the two routes disagree: a fault of the program; nothing may be used
`

const helpCautions = `A refusal stops the work and goes to standard error:

  drawup: refused: weight-missing
    the dose is per kg and no body weight is given
    rule: R3
    do: add --weight "72 kg"

The code never changes its meaning. All refusals are told at once. A caution has
the same form, starts with "caution:" and stands below the answer: the answer
holds, and a person has to weigh it. With --json both are lists of objects with
code, message, field, got, want, rule, source and remedy; where something else can
be made, the refusal has it worked in full, as an object, instead.

Without --drug a quick sum checks no limit of any drug (limits-not-checked).
Local policy, the pack in the hand and licensed staff decide.
`

const helpPrepare = `drawup prepare: plan an order: sheets, labels, pump cards, check sheets, plan.json
  drawup prepare testdata/orders/harbour-morning.toml --out out

  drawup prepare ORDER... [flags]

  --out              out             folder to write to; the current one if left out
  --leave-out        3,7             numbers of syringes to leave out; the papers say so
  --at               "2026-12-01 07:30"
                                     time prepared, in place of the order's
  --stock            a4-65           stock for syringe labels
  --infusion-stock   a4-24           stock for infusion labels
  --labels-used      5               labels already taken from the first sheet
  --mono                             for a printer without colours
  --formulary        my-site.toml    the site's own formulary files, over the starter
  --approval         approval.toml   who signed for it
  --shelf            shelf.toml      what there is to make them from: see drawup help shelf
  --explain                          what was chosen, why, and what else was weighed
  --json                             print plan.json in place of the table

Everything is worked and placed before anything is written: a refusal leaves no
file. With several orders each gets a folder of its own. plan.json is written
last; a folder without it is not a complete set.
`

const helpLabel = `drawup label: one label, at the moment its syringe is filled
  drawup label testdata/orders/harbour-morning.toml --syringe 3 --out label.pdf

  drawup label ORDER --syringe N [flags]

  --syringe          3               number in the table of drawup prepare
  --out              label.pdf       file to write; label-N.pdf if left out
  --at               "2026-12-01 07:30"
                                     time the syringe was filled; now if left out
  --stock            roll-40x15      stock; the roll that fits if left out
  --mono                             for a printer without colours
  --formulary        my-site.toml    the site's own formulary files, over the starter
  --approval         approval.toml   who signed for it
  --shelf            shelf.toml      what there is to make it from; the one of drawup prepare
  --json                             print the plan of this syringe
`

const helpRead = `drawup read: what a scanned label or pack says, in words
  drawup read "]d291N01AX07<GS>92261201193000001003<GS>932mg/mL" --at "2026-12-01 12:00"
  drawup read "(01)09521234000006(17)271231(10)A-1(21)7"

  drawup read [TEXT] [flags]        without TEXT one line from standard input: start it, then scan

  --at               "2026-12-01 12:00"
                                     the time to hold the use-by against; now if left out
  --order            day.toml        an order with the site's own GTINs, to name what they stand for
  --formulary        my-site.toml    the site's own formulary file, over the starter
  --style            uk              house style of numbers and units: uk, us, si
  --json                             the answer as a JSON document

A separator may be the sign GS (29) or stand as <GS> {GS} [GS] <FNC1> {FNC1}
[FNC1] ^]. A symbology identifier such as ]d2 in front, and identifiers in
parentheses, are read. Times are those of the clock where the label was made. If
a scanner sends no separators, set it to send GS; nothing is guessed.
`

const helpFormulary = `drawup formulary: what is stored of each drug, checked, compared, printed, approved
  drawup formulary list --class NMB
  drawup formulary show noradrenaline
  drawup formulary verify my-site.toml
  drawup formulary compare starter my-site.toml

  list                               one line a drug
     --class         NMB             of one label class only
     --flag          "high alert"    with this mark only
     --jurisdiction  UK              with a source or a standard of this jurisdiction
  show DRUG                          all that is stored of one drug, by any of its names
  pair DRUG with DRUG                whether two drugs may share a syringe, and within which
                                     limits; refused unless the formulary allows the pair
     --use           infusion        bolus unless given
     --route         epidural        IV unless given
  verify [FILE...]                   hold a formulary against itself: every finding with
                                     file, line and column; the starter without a file
  compare OLDER NEWER                what changed, what was loosened first; a file, a folder
                                     of files, or the word starter
  print                              a PDF to check and to sign
  standards                          the standard preparations as a table (CSV)
  approval                           the file that says who signed, for this digest
     --signed        "A. Example, pharmacist"   twice: two people
     --review        2027-12-01      the last day on which it holds
  schema                             every key that a formulary file may have

  --formulary        my-site.toml    the site's own files over the starter, and tables
                                     (.csv) of standard preparations; may be typed again
  --approval         approval.toml   who signed for it
  --at               2026-12-01      the day, in place of today
  --out              FILE            where print, standards and approval write
  --json                             the answer as a JSON document

The first line says whether anybody approved the data for use here. What stands
in double quotes is written the same way in an order. A site's file that loosens
a limit of the starter needs a reason beside the figure, or it is refused.
`

func runHelp(e env, args []string) int {
	r := request{name: "help"}
	for _, a := range args {
		if a == "-h" || a == "--help" {
			args = nil
			break
		}
	}
	switch len(args) {
	case 0:
		return e.print(overview())
	case 1:
		if text, ok := helpText(args[0]); ok {
			return e.print(text)
		}
		r.add(refusal.Reason{
			Code: refusal.FlagUnknown, Field: "topic", Got: args[0], Want: "a command or a topic",
			Message: fmt.Sprintf("got %q, want a command or a topic", args[0]),
			Remedy:  nearestOr(args[0], helpNames(), "", "type drawup help for the list"),
		})
	default:
		r.add(refusal.Reason{
			Code: refusal.FlagUnknown, Field: "topic", Got: strings.Join(args, " "), Want: "one topic",
			Message: fmt.Sprintf("got %d topics, want one", len(args)), Remedy: "ask for one at a time",
		})
	}
	return finish(e, false, &bareDocument{}, nil, r.faults)
}

func (e env) print(text string) int {
	if _, err := fmt.Fprint(e.stdout, text); err != nil {
		return outputFault(e, err)
	}
	return exitMade
}

func helpNames() []string {
	var names []string
	for _, c := range commands() {
		names = append(names, c.name)
	}
	for _, t := range topics() {
		names = append(names, t.name)
	}
	return names
}

// overview is the first page of help.
func overview() string {
	var b strings.Builder
	b.WriteString("drawup plans and labels drug syringes.\n\nusage: drawup COMMAND [flags]\n\n")
	for _, c := range commands() {
		fmt.Fprintf(&b, "  %s%s\n", pad(c.name, 12), c.summary)
	}
	b.WriteString("\ndrawup help COMMAND lists its flags. Topics of help:\n\n")
	for _, t := range topics() {
		fmt.Fprintf(&b, "  %s%s\n", pad(t.name, 12), t.summary)
	}
	return b.String()
}

// flagsOf is the flags and an example of a quick sum; false for other commands.
func flagsOf(name string) ([]flagSpec, string, bool) {
	switch name {
	case "mix":
		return mixFlags(), `drawup mix --amount "4 mg" --final "50 mL" --strength "1 mg/mL"`, true
	case "rate":
		return rateFlags(), `drawup rate --dose "0.1 microgram/kg/min" --weight "70 kg" --mix "4 mg in 50 mL"`, true
	case "dose":
		return doseFlags(), `drawup dose --dose "0.3 mg/kg" --weight "72 kg" --concentration "10 mg/mL"`, true
	case "total":
		return totalFlags(), `drawup total --rate "0.375 microgram/kg/min" --time "24 h" --load "0.05 mg/kg"`, true
	case "flow":
		return flowFlags(), `drawup flow --volume "1000 mL" --time "8 h" --set "20 drops/mL"`, true
	case "local":
		return localFlags(), `drawup local --weight "70 kg" --age "40 years" --give "lidocaine 1 %, 5 mL" --give "bupivacaine 0.25 %, 20 mL"`, true
	case "accuracy":
		return accuracyFlags(), `drawup accuracy --barrel "10 mL" --reading "4 mL"`, true
	case "body":
		return bodyFlags(), `drawup body --weight "72 kg" --height "178 cm" --sex male --age "54 years"`, true
	case "convert":
		return convertFlags(), `drawup convert --from "1 g" --to mmol --of "magnesium sulfate heptahydrate"`, true
	}
	return nil, "", false
}

// helpText is the page of a command or topic.
func helpText(name string) (string, bool) {
	for _, t := range topics() {
		if t.name == name {
			return t.text, true
		}
	}
	switch name {
	case "prepare":
		return helpPrepare, true
	case "label":
		return helpLabel, true
	case "formulary":
		return helpFormulary, true
	case "wording":
		return wordingHelp(), true
	case "read":
		return helpRead, true
	}
	flags, example, ok := flagsOf(name)
	if !ok {
		if name == "help" {
			return overview(), true
		}
		return commandSummary(name)
	}
	var b strings.Builder
	summary, _ := commandSummary(name)
	fmt.Fprintf(&b, "%s\n  %s\n\n", summary, example)
	for _, f := range flags {
		fmt.Fprintf(&b, "  %s%s%s\n", pad("--"+f.name, 18), pad(f.example, 32), f.use)
	}
	fmt.Fprintf(&b, "  %s%s%s\n", pad("--json", 18), pad("", 32), "the answer as a JSON document")
	fmt.Fprintf(&b, "  %s%s%s\n", pad("--style", 18), pad("uk", 32), "house style of numbers and units: uk, us, si")
	return b.String(), true
}

func commandSummary(name string) (string, bool) {
	for _, c := range commands() {
		if c.name == name {
			return fmt.Sprintf("drawup %s: %s\n", c.name, c.summary), true
		}
	}
	return "", false
}

func showHelp(e env, name string) int {
	text, _ := helpText(name)
	return e.print(text)
}
