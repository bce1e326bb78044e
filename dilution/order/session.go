package order

import (
	"strconv"
	"strings"
	"time"

	"drawup/dilution/quantity"
	"drawup/dilution/refusal"

	// The zones are the same on every machine that has none of its own (R19).
	_ "time/tzdata"
)

const (
	wantDate  = `a date as year-month-day such as "2026-12-01"`
	wantClock = `a time of day on the 24-hour clock such as "07:30"`
	wantZone  = `a zone such as "Europe/Berlin", "UTC" or "+01:00"`
	wantSpan  = `a span from 1 min to 30 days such as "4 h" or "30 min"`

	// longestSpan bounds the use-by times of the site. The bound is our own, wide
	// and against slips of the pen; no source gives one.
	longestSpan = 30 * 24 * time.Hour
)

// session reads when, where and by whom.
func (r *reader) session(s sessionRecord) {
	p := []any{"session"}
	date, clock := r.loose(s.Date, at(p, "date")), r.loose(s.Prepared, at(p, "prepared"))
	out := Session{
		Place:    r.text(s.Place, at(p, "place")),
		Date:     read(r, date, parseDate, at(p, "date")),
		Clock:    read(r, clock, parseClock, at(p, "prepared")),
		Preparer: r.text(s.Preparer, at(p, "preparer")),
		Invented: s.Invented,
	}
	zone := read(r, s.Zone, parseZone, at(p, "zone"))
	out.Zone = Field[string]{Value: "UTC", Text: zone.Text, Pos: zone.Pos}
	if zone.Value != nil {
		r.zone = zone.Value
		out.Zone.Value = zone.Text
	}
	r.required(out.Place.Given(), p, "place", "the session", `place = "theatre 2"`)
	r.required(out.Date.Given() || r.places.Has(at(p, "date")...), p, "date", "the session", `date = "2026-12-01"`)
	r.required(out.Clock.Given() || r.places.Has(at(p, "prepared")...), p, "prepared", "the session", `prepared = "07:30"`)
	r.required(out.Preparer.Given(), p, "preparer", "the session", `preparer = "A. Example"`)
	out.Prepared = r.prepared(out, zone.Given() && zone.Value == nil)
	r.order.Session = out
}

// prepared is the moment of date and clock. A time that the clock change skips
// or shows twice is no moment, and is refused.
func (r *reader) prepared(s Session, zoneUnread bool) Field[time.Time] {
	f := Field[time.Time]{Pos: s.Clock.Pos}
	if s.Date.Value == "" || s.Clock.Value == "" || zoneUnread {
		return f
	}
	f.Text = s.Date.Value + " " + s.Clock.Value
	const form = "2006-01-02 15:04"
	t, err := time.ParseInLocation(form, f.Text, r.zone)
	path := []any{"session", "prepared"}
	switch {
	case err != nil || t.Format(form) != f.Text:
		r.refuse(path, refusal.Reason{Code: refusal.TimeMalformed, Got: f.Text, Want: "a time that exists on this day in " + s.Zone.Value,
			Message: "the clocks go forward over this time on this day, so that it never comes", Rule: "R18",
			Remedy: `write the time that the clock really showed, or the zone as hours from UTC, zone = "+01:00"`})
	case shownTwice(t):
		r.refuse(path, refusal.Reason{Code: refusal.TimeMalformed, Got: f.Text, Want: "a time that comes once on this day in " + s.Zone.Value,
			Message: "the clocks go back on this day and show this time twice, so that it is not clear which one is meant", Rule: "R18",
			Remedy: `write the zone as hours from UTC, zone = "+01:00"`})
	default:
		f.Value = t
	}
	return f
}

// shownTwice reports whether the zone's clocks show t's reading at another
// moment as well: the offset before or after the nearest change gives it.
func shownTwice(t time.Time) bool {
	const form = "2006-01-02 15:04"
	_, here := t.Zone()
	start, end := t.ZoneBounds()
	var neighbours []time.Time
	if !start.IsZero() {
		neighbours = append(neighbours, start.Add(-time.Second))
	}
	if !end.IsZero() {
		neighbours = append(neighbours, end)
	}
	for _, there := range neighbours {
		_, offset := there.Zone()
		other := t.Add(time.Duration(here-offset) * time.Second)
		if !other.Equal(t) && other.Format(form) == t.Format(form) {
			return true
		}
	}
	return false
}

// parseDate reads "2026-12-01". Years outside 2000 to 2199 are slips.
func parseDate(s string) (string, error) {
	t, err := time.Parse("2006-01-02", s)
	if err != nil {
		return "", &timeError{got: s, want: wantDate, why: "it is not a day of the calendar in this form"}
	}
	if t.Year() < 2000 || t.Year() > 2199 {
		return "", &timeError{got: s, want: wantDate, why: "the year is not one of this time"}
	}
	return s, nil
}

// parseClock reads "07:30", and "07:30:00" as TOML writes a time.
func parseClock(s string) (string, error) {
	text := strings.TrimSuffix(s, ":00")
	if len(text) < 5 {
		text = s
	}
	if t, err := time.Parse("15:04", text); err == nil && len(text) == 5 {
		return t.Format("15:04"), nil
	}
	e := &timeError{got: s, want: wantClock, why: "it is not hours and minutes in this form"}
	if t, err := time.Parse("15:04", strings.Replace(s, ".", ":", 1)); err == nil {
		e.likely = t.Format("15:04")
	}
	return "", e
}

// parseZone reads an IANA name or a difference from UTC. "Local" is refused:
// it would mean another time on another machine.
func parseZone(s string) (*time.Location, error) {
	fault := &wordError{s, wantZone}
	if len(s) == 6 && (s[0] == '+' || s[0] == '-') && s[3] == ':' {
		t, err := time.Parse("15:04", s[1:])
		seconds := t.Hour()*3600 + t.Minute()*60
		if err != nil || seconds > 14*3600 {
			return nil, fault
		}
		if s[0] == '-' {
			seconds = -seconds
		}
		return time.FixedZone(s, seconds), nil
	}
	if s == "" || strings.EqualFold(s, "Local") {
		return nil, fault
	}
	zone, err := time.LoadLocation(s)
	if err != nil {
		return nil, fault
	}
	return zone, nil
}

// parseSpan reads "4 h", "30 min", "1 day": whole numbers, from 1 min to
// longestSpan.
func parseSpan(s string) (time.Duration, error) {
	fault := func(why, likely string) (time.Duration, error) {
		return 0, &timeError{got: s, want: wantSpan, why: why, likely: likely}
	}
	text := strings.TrimSpace(s)
	end := strings.IndexFunc(text, func(r rune) bool { return r < '0' || r > '9' })
	if end < 0 {
		return fault("the unit is missing", "")
	}
	number, unit := text[:end], strings.TrimSpace(text[end:])
	if strings.HasPrefix(unit, ",") {
		return 0, &quantity.SyntaxError{Got: s, Want: wantSpan, Why: "a comma can mean a decimal or a thousand", Code: quantity.CommaNumber}
	}
	if number == "" || number[0] == '0' {
		return fault("it does not begin with a whole number from 1", "")
	}
	one, ok := spanUnit(unit)
	if !ok && strings.HasPrefix(unit, ".") {
		return fault("the number is not whole: use the smaller unit", "")
	}
	if !ok {
		return fault("the unit is not one of min, h, day", "")
	}
	// A number that no int holds is too long as well.
	n, err := strconv.Atoi(number)
	if err != nil || n > int(longestSpan/one) {
		return fault("it is longer than 30 days, a wide bound of our own against slips of the pen", "")
	}
	return time.Duration(n) * one, nil
}

// spanUnit is one of the unit that a span of time may have.
func spanUnit(word string) (time.Duration, bool) {
	switch word {
	case "min", "minute", "minutes":
		return time.Minute, true
	case "h", "hr", "hour", "hours":
		return time.Hour, true
	case "d", "day", "days":
		return 24 * time.Hour, true
	}
	return 0, false
}

// parseExpiry reads the day or the month that a pack states. The presentation
// may be used up to the last minute of that day or month (common practice, no
// source: packs that give a month mean its last day).
func (r *reader) parseExpiry(s string) (time.Time, error) {
	want := `a date such as "2027-03-31" or a month such as "2027-03"`
	if t, err := time.ParseInLocation("2006-01", s, r.zone); err == nil && inThisTime(t) {
		return t.AddDate(0, 1, 0).Add(-time.Minute), nil
	}
	if t, err := time.ParseInLocation("2006-01-02", s, r.zone); err == nil && inThisTime(t) {
		return t.AddDate(0, 0, 1).Add(-time.Minute), nil
	}
	return time.Time{}, &timeError{got: s, want: want, why: "it is not a day or month of the calendar in this form"}
}

func inThisTime(t time.Time) bool { return t.Year() >= 2000 && t.Year() < 2200 }
