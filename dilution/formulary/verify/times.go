package verify

import (
	"fmt"
	"slices"
	"strings"
	"time"

	"drawup/dilution/formulary"
	"drawup/dilution/refusal"
)

// How long a diluted drug may be kept at all, and how it is written. Documents
// give hours up to a day and whole days beyond it, in hours up to five days: "24 h",
// "96 h", "7 days". A time that breaks the habit is one whose figure has slipped.
// The longest that was seen is 30 days; all bounds are our own choice.
const (
	shortestKept = 5 * time.Minute
	longestKept  = 45 * 24 * time.Hour
	longestRun   = 30 * 24 * time.Hour
	longestPause = 24 * time.Hour
	day          = 24 * time.Hour
)

// odd says what is odd about a time as it is written, "" when nothing is.
func odd(d time.Duration, text string) string {
	_, unit, _ := strings.Cut(text, " ")
	switch {
	case d > day && d%day != 0:
		return "whole days beyond 24 h"
	case unit == "h" && d > 5*day:
		return "days for more than 120 h"
	case unit == "min" && d > 2*time.Hour:
		return "hours for more than 120 min"
	}
	return ""
}

// time bounds one time and how it is written.
func (c *check) time(d time.Duration, text string, least, most time.Duration, pos refusal.Pos, field, what string) {
	want := odd(d, text)
	if d < least || d > most {
		want = inWords(least) + " to " + inWords(most)
	}
	if want != "" {
		c.find(refusal.Implausible, pos, field, text, want, "%s of %s is not one that documents give", what, text)
	}
}

// inWords is a time of the bounds above, "45 days".
func inWords(d time.Duration) string {
	if d%day == 0 {
		return fmt.Sprintf("%d days", d/day)
	}
	return fmt.Sprintf("%d min", d/time.Minute)
}

// times bounds how long a preparation is kept, how long an infusion runs, and
// how soon a dose is repeated.
func (c *check) times() {
	for _, s := range c.drug.Stability {
		c.time(time.Duration(s.Minutes)*time.Minute, s.Text, shortestKept, longestKept, s.Pos, "hours", "a time in use")
	}
	for _, r := range c.drug.Doses {
		if r.RepeatAfter.Given() {
			c.time(r.RepeatAfter.Value, r.RepeatAfter.Text, time.Minute, longestPause, r.RepeatAfter.Pos, "repeat_after", "a pause before the next dose")
		}
	}
	for _, r := range c.drug.Rates {
		if r.Longest.Given() {
			c.time(r.Longest.Value, r.Longest.Text, time.Minute, longestRun, r.Longest.Pos, "longest", "a run")
		}
	}
}

// stability wants each time in use to be for a fluid that a presentation allows
// and for concentrations that the record has.
func (c *check) stability() {
	for _, s := range c.drug.Stability {
		known := s.Diluent == "any" || s.Diluent == "neat" || slices.ContainsFunc(c.drug.Presentations, func(p formulary.Presentation) bool {
			return slices.Contains(p.AddFluids, s.Diluent) || slices.ContainsFunc(p.Diluents, func(d formulary.Diluent) bool { return d.Name == s.Diluent })
		})
		if !known {
			c.find(refusal.ValueUnknown, s.Pos, "diluent", s.Diluent, "any, neat, or a diluent of a presentation",
				"the stability is for %q, which no presentation allows", s.Diluent)
		}
		if !slices.Contains([]string{"room", "refrigerator"}, s.Storage) || !slices.Contains([]string{"", "syringe", "bag", "glass"}, s.Container) {
			c.find(refusal.ValueUnknown, s.Pos, "storage", fmt.Sprintf("%s, %s", s.Storage, s.Container), "room or refrigerator; syringe, bag or glass",
				"the stability does not say how and in what it is kept")
		}
	}
}
