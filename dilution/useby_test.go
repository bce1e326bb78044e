package dilution_test

import (
	"strings"
	"testing"

	"drawup/dilution"
)

// useBy plans one syringe of an order with the given lines in [session] and
// [site] and returns the plan.
func useBy(t *testing.T, sessionLines, siteLines, body string) dilution.Plan {
	t.Helper()
	text := "[session]\n" + key("place", "theatre 2") + "\n" + sessionLines + key("preparer", "A. Example") + "\ninvented = true\n" +
		"[site]\n" + siteLines + adult + "\n[[patient.syringe]]\n" + body
	list, reasons := plan(t, starter(t), text)
	if reasons.Refused() || len(list.Plans) != 1 {
		t.Fatalf("refused:\n%v", reasons.Refusals())
	}
	return list.Plans[0]
}

// Elapsed hours are absolute (rule R18). Clocks in London go forward at 01:00
// UTC on 28 March 2027 and back at 01:00 UTC on 25 October 2026 (the last
// Sundays of March and October, European summer-time rule): twelve hours from
// 20:00 end at 09:00 and at 07:00.
func TestUseByOverAClockChange(t *testing.T) {
	for _, c := range []struct{ date, printed, offset string }{
		{"2027-03-27", "2027-03-28 09:00", "+01:00"},
		{"2026-10-24", "2026-10-25 07:00", "Z"},
		{"2026-12-01", "2026-12-02 08:00", "Z"},
	} {
		p := useBy(t, lines(key("date", c.date), key("prepared", "20:00"), key("zone", "Europe/London")), key("bolus_use_by", "12 h")+"\n",
			lines(key("drug", "suxamethonium"), key("presentation", "ampoule 100 mg in 2 mL"), key("dose", "1 mg/kg")))
		want(t, c.date, p.UseBy.At.Format("2006-01-02 15:04"), c.printed)
		want(t, c.date, p.UseBy.At.Format("Z07:00"), c.offset)
		if p.UseBy.Minutes != 720 || p.UseBy.At.Sub(p.Prepared).Hours() != 12 {
			t.Errorf("%s: got %d min and %v, want 12 hours", c.date, p.UseBy.Minutes, p.UseBy.At.Sub(p.Prepared))
		}
	}
}

// The earliest of policy, stability and expiry wins, and the plan says which.
func TestEarliestUseByWins(t *testing.T) {
	day := lines(key("date", "2026-12-01"), key("prepared", "07:30"))
	undiluted := lines(key("drug", "suxamethonium"), key("presentation", "ampoule 100 mg in 2 mL"), key("dose", "1 mg/kg"))
	// UK and European texts: drawn up propofol is used within 6 hours.
	propofol := lines(key("drug", "propofol"), key("presentation", "ampoule 200 mg in 20 mL"), key("dose", "2 mg/kg"))
	for _, c := range []struct{ name, site, body, at, won string }{
		{"policy", key("bolus_use_by", "8 h"), undiluted, "2026-12-01 15:30", "site policy"},
		{"policy before stability", key("bolus_use_by", "2 h"), propofol, "2026-12-01 09:30", "site policy"},
		{"stability", key("bolus_use_by", "12 h"), propofol, "2026-12-01 13:30", "stability"},
		{"equal: the site's own", key("bolus_use_by", "6 h"), propofol, "2026-12-01 13:30", "site policy"},
		{"expiry", key("bolus_use_by", "24 h"), undiluted + "expiry = 2026-12-01\n", "2026-12-01 23:59", "expiry"},
		{"expiry later", key("bolus_use_by", "8 h"), undiluted + "expiry = 2026-12-02\n", "2026-12-01 15:30", "site policy"},
	} {
		p := useBy(t, day, c.site+"\n", c.body)
		want(t, c.name, p.UseBy.At.Format("2006-01-02 15:04"), c.at)
		if !strings.HasPrefix(p.UseBy.Won, c.won) {
			t.Errorf("%s: got %q, want %s", c.name, p.UseBy.Won, c.won)
		}
	}
}

// A silent site gets the printed default: 4 h for a bolus, and it says that
// nobody has verified it.
func TestDefaultUseBy(t *testing.T) {
	p := useBy(t, lines(key("date", "2026-12-01"), key("prepared", "07:30")), "", lines(key("drug", "suxamethonium"), key("presentation", "ampoule 100 mg in 2 mL"), key("dose", "1 mg/kg")))
	want(t, "default", p.UseBy.At.Format("15:04"), "11:30")
	if !strings.Contains(p.UseBy.Source, "unverified") {
		t.Errorf("got the source %q, want it marked unverified", p.UseBy.Source)
	}
}
