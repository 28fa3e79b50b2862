package exchange

import (
	"strings"

	"gylebook/gravity"
	"gylebook/gravity/asread"
)

// withMark rewrites the decimal mark of the number that text begins with, and takes
// out marks between thousands. Digits, sign and what follows the number stay.
func withMark(text string, mark rune) string {
	end := signLen(text)
	for end < len(text) && (isDigit(text[end]) || text[end] == '.' || text[end] == ',') {
		end++
	}
	num, rest := text[:end], text[end:]
	last := strings.LastIndexAny(num, ".,")
	if last < 0 {
		return text
	}
	whole, decimals := num[:last], num[last+1:]
	if strings.ContainsAny(whole, ".,") {
		v, err := asread.ParseNumber(num)
		if err != nil {
			return text // not a number: whoever parses it says so
		}
		return strings.Replace(v.String(), ".", string(mark), 1) + rest
	}
	return whole + string(mark) + decimals + rest
}

func isDigit(b byte) bool { return b >= '0' && b <= '9' }

func signLen(text string) int {
	for _, sign := range []string{"-", "+", "\u2212"} {
		if strings.HasPrefix(text, sign) {
			return len(sign)
		}
	}
	return 0
}

// thousandths returns 1.048 for the SG 1048, 1048.0 or 1048,0 that a spreadsheet
// makes of 1.048 when it takes the point as a mark between thousands.
func thousandths(text string) (string, bool) {
	v, err := asread.ParseNumber(text)
	if err != nil || !(v.Float() >= 980 && v.Float() <= 1180) || v.Float() != float64(int(v.Float())) {
		return text, false
	}
	digits, _, _ := strings.Cut(v.String(), ".")
	for len(digits) < 4 {
		digits = "0" + digits
	}
	return digits[:1] + "." + digits[1:], true
}

// plainText returns the typed text when it means the same without its scale, and
// otherwise the reading with its suffix.
func plainText(text, scale string) string {
	s, err := gravity.FindScale(scale)
	if err != nil {
		return text
	}
	meant, err := asread.ParseReading(text, s)
	if err != nil {
		return text
	}
	if bare, err := asread.ParseReading(text, gravity.ScaleSG); err == nil && bare.Scale == meant.Scale && bare.Value == meant.Value {
		return text
	}
	return meant.Canonical()
}
