// Command drawup plans drug syringes: it works dilutions, converts dose rates
// to pump rates, refuses what is unsafe, and prints labels and sheets.
//
// This package alone talks to people: it reads flags and files, reads the
// clock once, and writes results, refusals and exit codes. Every sum is worked
// in the packages below it.
package main

import (
	"fmt"
	"io"
	"os"
	"time"

	"drawup/dilution/refusal"
)

// Exit codes (design: all or nothing).
const (
	exitMade       = 0 // the result is there
	exitRefused    = 1 // the request was read and refused
	exitUnreadable = 2 // the request cannot be read
	exitDisagree   = 3 // the two routes disagree, a fault of the program
)

// An env is what a command may touch of the world outside.
type env struct {
	stdin          io.Reader
	stdout, stderr io.Writer
	now            func() time.Time // the only clock (rule R18)
}

// A command is one entry of the table: drawup NAME. The run function gets the
// arguments after the name and returns an exit code.
type command struct {
	name, summary string
	run           func(e env, args []string) int
}

// commands is the table, in the order in which help lists it. A new command
// adds one line.
func commands() []command {
	return []command{
		{"prepare", "plan an order: sheets, labels, pump cards, check sheets, plan.json", runPrepare},
		{"label", "one label, at the moment its syringe is filled", runLabel},
		{"read", "what a scanned label or pack says, in words", runRead},
		{"mix", "one dilution: what to draw, what to add, how strong it is", runMix},
		{"rate", "dose rate to pump rate and back, with a ladder", runRate},
		{"dose", "one dose to a volume", runDose},
		{"total", "a dose rate over a time, with a first dose: how much in all", runTotal},
		{"flow", "volume, time, flow rate: two give the third; drops a minute", runFlow},
		{"local", "local anaesthetics together against their maxima", runLocal},
		{"accuracy", "how far off a reading, a chain of steps or a fill may be", runAccuracy},
		{"body", "ideal, adjusted and lean weight; surface area; a child's weight by age", runBody},
		{"convert", "units, mmol, per cent, salt and base", runConvert},
		{"wording", "a sentence against the rules of numbers, units and names", runWording},
		{"formulary", "the stored drugs: list, show, verify, compare, print, approve", runFormulary},
		{"help", "this list, one command, or one topic", runHelp},
	}
}

func main() {
	os.Exit(run(os.Args[1:], os.Stdin, os.Stdout, os.Stderr))
}

// run does what args ask and returns the exit code.
func run(args []string, stdin io.Reader, stdout, stderr io.Writer) int {
	e := env{stdin: stdin, stdout: stdout, stderr: stderr, now: time.Now}
	if len(args) == 0 {
		fmt.Fprint(stderr, overview())
		return exitUnreadable
	}
	name := args[0]
	switch name {
	case "-h", "--help":
		name = "help"
	}
	for _, c := range commands() {
		if c.name == name {
			return c.run(e, args[1:])
		}
	}
	return unknownCommand(e, name, args[1:])
}

func unknownCommand(e env, name string, rest []string) int {
	names := []string{}
	for _, c := range commands() {
		names = append(names, c.name)
	}
	list := refusal.List{{
		Code: refusal.FlagUnknown, Severity: refusal.Refuse, Field: "command",
		Message: fmt.Sprintf("got %q, want a command", name), Got: name, Want: "a command",
		Remedy: nearestOr(name, names, "", "type drawup help for the list of commands"),
	}}
	return finish(e, wantsJSON(rest), &bareDocument{}, nil, list)
}
