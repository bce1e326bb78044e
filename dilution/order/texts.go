package order

import (
	"errors"
	"fmt"
	"strings"

	"drawup/dilution/body"
	"drawup/dilution/quantity"
	"drawup/dilution/refusal"
)

// A wordError says that a text is not one of the words that a key takes.
type wordError struct{ got, want string }

func (e *wordError) Error() string { return fmt.Sprintf("got %q, want %s", e.got, e.want) }

// A timeError says that a text is not a date, a time, a zone or a span.
// likely, if not empty, is what was probably meant.
type timeError struct{ got, want, why, likely string }

func (e *timeError) Error() string {
	return fmt.Sprintf("got %q, want %s: %s", e.got, e.want, e.why)
}

// textReason turns the fault of a text into a reason in plain words.
func textReason(key, text string, err error) refusal.Reason {
	r := refusal.Reason{Got: text, Message: fmt.Sprintf("the %s %q cannot be used: %v", spaced(key), text, err), Code: refusal.ValueUnknown}
	if strings.TrimSpace(text) == "" {
		r.Got, r.Code = "nothing", refusal.QuantityMissing
		r.Message = fmt.Sprintf("the %s is empty", spaced(key))
		r.Remedy = "write it, or take the line out"
	}
	likely := ""
	var syntax *quantity.SyntaxError
	var kind *quantity.KindError
	var word *wordError
	var moment *timeError
	var number *numberError
	switch {
	case errors.As(err, &syntax):
		r.Want, r.Rule = syntax.Want, "R1"
		why := strings.Replace(syntax.Why, "is not one of these", "does not fit here", 1)
		if r.Remedy == "" {
			r.Code = refusal.Code(syntax.Code)
			r.Message = fmt.Sprintf("the %s %q cannot be used: %s", spaced(key), text, why)
			if likely = syntax.Likely; likely != "" && syntax.Got != text {
				likely = strings.Replace(text, syntax.Got, likely, 1)
			}
		}
	case errors.As(err, &kind):
		r.Code, r.Rule = refusal.AmountKindDiffer, "R4"
	case errors.As(err, &word):
		r.Want = word.want
		r.Message = fmt.Sprintf("the %s %q is not one that can be chosen here", spaced(key), text)
	case errors.As(err, &number):
		number.explain(&r)
	case errors.As(err, &moment):
		r.Want = moment.want
		if r.Remedy == "" {
			r.Code, likely = refusal.TimeMalformed, moment.likely
			r.Message = fmt.Sprintf("the %s %q cannot be used: %s", spaced(key), text, moment.why)
		}
	}
	if r.Remedy == "" {
		r.Remedy = "write " + r.Want
		if likely != "" {
			r.Remedy = fmt.Sprintf("write %q, if that is meant", likely)
		}
	}
	return r
}

// spaced is a key in words.
func spaced(key string) string {
	switch key {
	case "prepared":
		return "time prepared"
	case "barrels":
		return "barrel"
	case "from", "to", "start":
		return key + " rate"
	case "one_ml_per_hour":
		return "dose rate that 1 mL/h gives"
	case "hours":
		return "time that it is to last"
	}
	return strings.ReplaceAll(strings.Replace(key, "use_by", "use-by", 1), "_", " ")
}

// text reads a line of words. A blank text counts as not given. What cannot
// stand on one line of paper is refused.
func (r *reader) text(s string, path []any) Field[string] {
	f := Field[string]{Value: strings.TrimSpace(s), Pos: r.places.Of(path...)}
	if f.Value == "" || r.broken[f.Pos.Line] {
		return Field[string]{Pos: f.Pos}
	}
	f.Text = s
	if r.printable(s, f.Value, path) {
		r.remember(f.Value, path)
	} else {
		f.Value = ""
	}
	return f
}

// unread reports a key that is there and has a reason of the file's form.
func (r *reader) unread(path []any) bool {
	return r.places.Has(path...) && r.broken[r.places.Of(path...).Line]
}

// loose reads a value that may be a text or a TOML date or time.
func (r *reader) loose(v any, path []any) string {
	switch v := v.(type) {
	case nil:
		return ""
	case string:
		return v
	case fmt.Stringer: // the decoder's dates and times
		return v.String()
	}
	line := r.places.Of(path...).Line
	if !r.broken[line] {
		r.refuse(path, refusal.Reason{Code: refusal.ValueWrongType, Got: fmt.Sprint(v), Want: "a text in quotes, or a date",
			Message: fmt.Sprintf("the value of %q is neither a text nor a date", key(path)), Remedy: "write it in quotes"})
		r.broken[line] = true
	}
	return ""
}

// required refuses a key that is missing or blank.
func (r *reader) required(given bool, base []any, name, of, want string) {
	path := at(base, name)
	if given || r.unread(path) {
		return
	}
	r.refuse(path, refusal.Reason{Code: refusal.KeyMissing, Message: fmt.Sprintf("%s has no %q", of, name),
		Got: "nothing", Want: want, Remedy: "add a line such as: " + want})
}

func parseStyle(s string) (quantity.Style, error) {
	style, ok := quantity.StyleNamed(s)
	if !ok {
		return quantity.Style{}, &wordError{s, `"uk", "us" or "si"`}
	}
	return style, nil
}

func parseSex(s string) (body.Sex, error) {
	sex, ok := body.SexNamed(s)
	if !ok {
		return 0, &wordError{s, `"female" or "male"`}
	}
	return sex, nil
}

func parseMethod(s string) (string, error) {
	switch s {
	case MakeUpTo, AddTo, WithdrawThenAdd:
		return s, nil
	}
	return "", &wordError{s, fmt.Sprintf("%q, %q or %q", MakeUpTo, AddTo, WithdrawThenAdd)}
}

func parseEdition(s string) (string, error) {
	switch s {
	case Edition2008, Edition2020:
		return s, nil
	}
	return "", &wordError{s, fmt.Sprintf("%q or %q", Edition2008, Edition2020)}
}

func parseAnticoagulants(s string) (string, error) {
	switch s {
	case Teal, White:
		return s, nil
	}
	return "", &wordError{s, fmt.Sprintf("%q or %q", Teal, White)}
}

func parseLine(s string) (string, error) {
	switch s {
	case "peripheral", "central":
		return s, nil
	}
	return "", &wordError{s, `"peripheral" or "central"`}
}

// kinds are the words that may follow a dose.
const kinds = `"actual", "ideal", "adjusted", "lean" or "surface"`

// cutWord cuts the word for the weight from a dose: "0.3 mg/kg lean",
// "0.3 mg/kg by lean body weight". word is "" when there is none.
func cutWord(text string) (head, word string, kind body.Kind) {
	f := strings.Fields(text)
	n := len(f)
	if n > 2 && f[n-1] == "weight" {
		n--
		if f[n-1] == "body" {
			n--
		}
	}
	if n < 2 {
		return text, "", 0
	}
	kind, ok := body.KindNamed(f[n-1])
	if !ok {
		return text, "", 0
	}
	word = f[n-1]
	if n--; n > 1 && f[n-1] == "by" {
		n--
	}
	return strings.Join(f[:n], " "), word, kind
}

// dosed reads a dose or dose rate with the word that may follow it.
func dosed[T any](r *reader, text string, parse func(string) (T, error), path []any) (Field[T], Field[body.Kind]) {
	head, word, kind := cutWord(text)
	dose := read(r, text, func(string) (T, error) {
		value, err := parse(head)
		if err == nil || word != "" {
			return value, err
		}
		// "0.3 mg/kg thin": the dose reads, the word after it does not.
		if f := strings.Fields(text); len(f) > 2 {
			if _, without := parse(strings.Join(f[:len(f)-1], " ")); without == nil {
				return value, &wordError{text, "the dose alone, or after it " + kinds}
			}
		}
		return value, err
	}, path)
	by := Field[body.Kind]{Pos: dose.Pos}
	if dose.Given() && word != "" {
		by.Value, by.Text = kind, word
	}
	return dose, by
}
