package formulary

import (
	"fmt"
	"regexp"
	"strings"
	"time"

	"drawup/dilution/refusal"
	"drawup/dilution/tomlfile"
)

// An Approval is what two people signed for: one formulary, known by its
// digest, for a time.
type Approval struct {
	Formulary string // name
	Version   string
	Digest    string // 64 hexadecimal digits
	Signers   [2]Signer
	Date      time.Time // of approval
	Review    time.Time // the last day on which it holds
	// Lapse says what happens when the approval does not hold: true prints
	// "not approved", false refuses.
	Lapse bool
	Pos   refusal.Pos
}

// A Signer is one of the two.
type Signer struct{ Name, Role string }

type approvalRecord struct {
	Formulary string         `toml:"formulary"`
	Version   string         `toml:"version"`
	Digest    string         `toml:"digest"`
	Date      any            `toml:"date"`
	Review    any            `toml:"review"`
	Otherwise string         `toml:"otherwise"` // refuse, not approved
	Signers   []signerRecord `toml:"signer"`
}

type signerRecord struct {
	Name string `toml:"name"`
	Role string `toml:"role"`
}

const approvalDay = "2006-01-02"

var wholeDigest = regexp.MustCompile(`^[0-9a-f]{64}$`)

// ReadApproval reads an approval file. It wants two different people, each with
// a role, a day of approval, and a later day of review.
func ReadApproval(t Text) (Approval, refusal.List) {
	var rec approvalRecord
	places, faults := tomlfile.Decode(t.Name, t.Data, &rec)
	if faults.Refused() {
		return Approval{}, faults
	}
	a := Approval{Formulary: rec.Formulary, Version: rec.Version, Digest: rec.Digest, Pos: refusal.Pos{File: t.Name, Line: 1, Column: 1}}
	fault := func(code refusal.Code, got, want, message string, path ...any) {
		faults = append(faults, refusal.Reason{Code: code, Severity: refusal.Refuse, Field: fmt.Sprint(path[len(path)-1]), Got: got, Want: want,
			Rule: "R13", Pos: places.Of(path...), Message: message, Remedy: "mend the approval file"})
	}
	if rec.Formulary == "" || rec.Version == "" {
		fault(refusal.KeyMissing, rec.Formulary+" "+rec.Version, "the name and version of the formulary", "the approval does not say what is approved", "formulary")
	}
	if !wholeDigest.MatchString(rec.Digest) {
		fault(refusal.ValueUnknown, rec.Digest, "the 64 digits that drawup formulary list prints", "the digest is not one", "digest")
	}
	switch rec.Otherwise {
	case "", "refuse":
	case "not approved":
		a.Lapse = true
	default:
		fault(refusal.ValueUnknown, rec.Otherwise, `"refuse" or "not approved"`, "the approval does not say what to do when it does not hold", "otherwise")
	}
	day := func(v any, key string) time.Time {
		text := dayText(v)
		d, err := time.Parse(approvalDay, text)
		if err != nil {
			fault(refusal.TimeMalformed, text, `a day such as "2026-12-01"`, "the day cannot be read", key)
		}
		return d
	}
	a.Date, a.Review = day(rec.Date, "date"), day(rec.Review, "review")
	if !a.Date.IsZero() && !a.Review.IsZero() && !a.Review.After(a.Date) {
		fault(refusal.KeyConflict, dayText(rec.Review), "a day after the approval", "the review comes before the approval", "review")
	}
	signers(rec.Signers, &a, fault)
	return a, faults
}

// dayText is a day as a text or as a date of the file format.
func dayText(v any) string {
	if v == nil {
		return ""
	}
	return fmt.Sprint(v)
}

func signers(list []signerRecord, a *Approval, fault func(refusal.Code, string, string, string, ...any)) {
	if len(list) != 2 {
		fault(refusal.KeyMissing, fmt.Sprint(len(list)), "two [[signer]] tables", "two people sign, no fewer and no more", "signer")
		return
	}
	for i, s := range list {
		if strings.TrimSpace(s.Name) == "" || strings.TrimSpace(s.Role) == "" {
			fault(refusal.KeyMissing, s.Name, "a name and a role", "the signer has no name or no role", "signer", i, "name")
		}
		a.Signers[i] = Signer(s)
	}
	if plainName(list[0].Name) == plainName(list[1].Name) {
		fault(refusal.ApprovedOnce, list[1].Name, "another person", "one person has signed twice", "signer", 1, "name")
	}
}

// plainName is a name without what two writings of it may differ in.
func plainName(s string) string {
	return strings.Join(strings.Fields(strings.ToLower(strings.ReplaceAll(s, ".", " "))), " ")
}

// Approve holds an approval against the formulary at a time, and gives the
// formulary as approved. An approval for another formulary, or past its day of
// review, is refused, or leaves the formulary not approved, as its file says.
func (f *Formulary) Approve(a Approval, at time.Time) (*Formulary, refusal.List) {
	fault := func(code refusal.Code, field, got, want, message string) (*Formulary, refusal.List) {
		if a.Lapse {
			out := *f
			out.lapsed = message
			return &out, nil
		}
		return f, refusal.List{{Code: code, Severity: refusal.Refuse, Field: field, Got: got, Want: want, Rule: "R13", Pos: a.Pos,
			Message: message, Remedy: "have the formulary approved again, or write otherwise = \"not approved\" into the approval file"}}
	}
	today := at.Format(approvalDay)
	switch {
	case a.Formulary != f.Name || a.Version != f.Version:
		return fault(refusal.ApprovedOther, "formulary", a.Formulary+" "+a.Version, f.Name+" "+f.Version, "the approval is for another formulary")
	case a.Digest != f.Digest:
		return fault(refusal.ApprovedOther, "digest", a.Digest, f.Digest, "the approval is for another text of this formulary: something was changed since")
	case today > a.Review.Format(approvalDay):
		return fault(refusal.ApprovalPast, "review", a.Review.Format(approvalDay), "a day of review from "+today, "the approval is past its day of review")
	case today < a.Date.Format(approvalDay):
		return fault(refusal.ApprovalPast, "date", a.Date.Format(approvalDay), "a day up to "+today, "the approval begins later")
	}
	out := *f
	out.approval = &a
	return &out, nil
}

// Approved reports whether two people have signed for the formulary.
func (f *Formulary) Approved() bool { return f.approval != nil }

// State is the approval line that every sheet carries.
func (f *Formulary) State() string {
	if f.approval == nil {
		switch {
		case f.lapsed != "":
			return "not approved: " + f.lapsed
		case f.Base == "" && f.Name == starterName:
			return "starter formulary, not approved for use here"
		}
		return "not approved"
	}
	a := f.approval
	return fmt.Sprintf("approved %s, version %s, by %s (%s) and %s (%s), review %s", a.Date.Format(approvalDay), a.Version,
		a.Signers[0].Name, a.Signers[0].Role, a.Signers[1].Name, a.Signers[1].Role, a.Review.Format(approvalDay))
}

// starterName is the name of the embedded formulary.
const starterName = "starter formulary"
