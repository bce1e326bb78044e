package main

import (
	"errors"
	"fmt"

	"github.com/spf13/pflag"

	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// faultOf turns an error of the packages below into a reason. field is the
// flag or key in the user's words.
func faultOf(field string, err error) refusal.Reason {
	r := refusal.Reason{Severity: refusal.Refuse, Field: field, Message: field + ": " + err.Error()}
	var syntax *quantity.SyntaxError
	var kind *quantity.KindError
	var basis *quantity.BasisError
	var missing *quantity.NotGivenError
	switch {
	case errors.As(err, &syntax):
		r.Code, r.Got, r.Want, r.Rule = refusal.Code(syntax.Code), syntax.Got, syntax.Want, "R1"
		r.Message = fmt.Sprintf("%s: got %q: %s", field, syntax.Got, syntax.Why)
		r.Remedy = "write " + syntax.Want
		if syntax.Likely != "" {
			r.Remedy = fmt.Sprintf("if %q is meant, write that; if not, write %s", syntax.Likely, syntax.Want)
		}
	case errors.As(err, &kind):
		r.Code, r.Got, r.Want, r.Rule = refusal.AmountKindDiffer, kind.Got.String(), kind.Want.String(), "R4"
		r.Message = fmt.Sprintf("%s: one quantity is counted by %v, the other by %v; no factor joins them", field, kind.Got, kind.Want)
		r.Remedy = "give both in the same kind of unit, as the presentation in the hand states it"
		if kind.Got != quantity.ByActivity && kind.Want != quantity.ByActivity {
			r.Remedy += "; drawup convert joins mass and mmol of a named salt"
		}
	case errors.As(err, &basis):
		r.Code, r.Got, r.Want, r.Rule = refusal.UnitWrongKind, basis.Got.String(), basis.Want.String(), "R3"
		r.Remedy = "check the unit of the dose against the order"
	case errors.As(err, &missing):
		r.Code, r.Want = refusal.QuantityMissing, missing.What
		r.Remedy = "give the " + missing.What
	default:
		r.Code = refusal.ValueUnknown
		r.Remedy = "check what was typed"
	}
	return r
}

// flagFault turns an error of the flag reader into a reason. names are the
// flags that the command knows.
func flagFault(err error, names []string) refusal.Reason {
	r := refusal.Reason{Code: refusal.FlagUnknown, Severity: refusal.Refuse, Message: err.Error()}
	var unknown *pflag.NotExistError
	var bare *pflag.ValueRequiredError
	var value *pflag.InvalidValueError
	switch {
	case errors.As(err, &unknown):
		name := unknown.GetSpecifiedName()
		r.Field, r.Got, r.Want = "--"+name, name, flagList(names)
		r.Message = fmt.Sprintf("got the flag %q, which this command does not have", name)
		r.Remedy = nearestOr(name, names, "--", "the flags are "+flagList(names))
	case errors.As(err, &bare):
		return noValue(bare.GetSpecifiedName())
	case errors.Is(err, errNoValue) && errors.As(err, &value):
		return noValue(value.GetFlag().Name)
	case errors.Is(err, errGivenTwice) && errors.As(err, &value):
		name := value.GetFlag().Name
		r.Code, r.Field, r.Got = refusal.FlagConflict, "--"+name, value.GetValue()
		r.Message = "--" + name + " is given twice, the second time as " + fmt.Sprintf("%q", value.GetValue())
		r.Remedy = "give --" + name + " once"
	default:
		r.Field, r.Remedy = "flags", "the flags are "+flagList(names)
	}
	return r
}

func noValue(name string) refusal.Reason {
	return refusal.Reason{
		Code: refusal.FlagMissing, Severity: refusal.Refuse, Field: "--" + name,
		Message: "--" + name + " has no value",
		Remedy:  `put the value in quotes after it, as in --weight "72 kg"`,
	}
}

// nearestOr is a remedy that names the known word nearest to got, or other
// when none is near: at most two letters changed, added, lost or swapped.
func nearestOr(got string, known []string, dashes, other string) string {
	best, at := "", 3
	for _, k := range known {
		if d := distance(got, k); d < at && d < len(k) {
			best, at = k, d
		}
	}
	if best == "" {
		return other
	}
	return fmt.Sprintf("if %s%s is meant, type that; %s", dashes, best, other)
}

// distance counts single-letter changes between a and b; swapping two
// neighbours counts as one.
func distance(a, b string) int {
	before := make([]int, len(b)+1)
	last := make([]int, len(b)+1)
	for j := range last {
		last[j] = j
	}
	for i := 1; i <= len(a); i++ {
		now := make([]int, len(b)+1)
		now[0] = i
		for j := 1; j <= len(b); j++ {
			cost := 1
			if a[i-1] == b[j-1] {
				cost = 0
			}
			now[j] = min(last[j]+1, now[j-1]+1, last[j-1]+cost)
			if i > 1 && j > 1 && a[i-1] == b[j-2] && a[i-2] == b[j-1] {
				now[j] = min(now[j], before[j-2]+1)
			}
		}
		before, last = last, now
	}
	return last[len(b)]
}
