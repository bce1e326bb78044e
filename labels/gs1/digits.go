package gs1

import "fmt"

// CheckDigit is the last digit of a GTIN whose other digits are given: weights
// 3 and 1 from the right, filled up to the next ten. It wants digits only.
func CheckDigit(body string) (byte, error) {
	sum := 0
	for i := range body {
		c := body[len(body)-1-i]
		if c < '0' || c > '9' {
			return 0, fmt.Errorf("got %q, want digits", body)
		}
		weight := 3
		if i%2 == 1 {
			weight = 1
		}
		sum += weight * int(c-'0')
	}
	return byte('0' + (10-sum%10)%10), nil
}

func checkGTIN(value string) error {
	want, err := CheckDigit(value[:13])
	if err != nil {
		return err
	}
	if value[13] != want {
		return fmt.Errorf("got check digit %c in %q, want %c", value[13], value, want)
	}
	return nil
}

// two is the number in two digits; the caller has made sure of digits.
func two(s string) int { return int(s[0]-'0')*10 + int(s[1]-'0') }

// checkDate wants YYMMDD; day 00 stands for the month as a whole.
func checkDate(value string) error {
	if two(value[4:]) == 0 && two(value[2:]) >= 1 && two(value[2:]) <= 12 {
		return nil
	}
	return checkDay(value)
}

// checkDay wants YYMMDD with a day that exists. In the century window of two
// digits every fourth year is a leap year: 2000 was one.
func checkDay(value string) error {
	month, day, days := two(value[2:]), two(value[4:]), 31
	switch month {
	case 4, 6, 9, 11:
		days = 30
	case 2:
		days = 28
		if two(value)%4 == 0 {
			days = 29
		}
	}
	if month < 1 || month > 12 || day < 1 || day > days {
		return fmt.Errorf("got date %q, want year, month and day that exist", value[:6])
	}
	return nil
}

// checkMoment wants YYMMDDHHMM.
func checkMoment(value string) error {
	if err := checkDay(value[:6]); err != nil {
		return err
	}
	if two(value[6:]) > 23 || two(value[8:]) > 59 {
		return fmt.Errorf("got time %q, want 0000 to 2359", value[6:])
	}
	return nil
}
