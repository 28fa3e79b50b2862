package asread

import (
	"strconv"
	"strings"
	"unicode/utf8"

	"github.com/shopspring/decimal"
)

// maxNumber is the longest number read, in characters. A glass gives five.
const maxNumber = 40

// Value is a number that keeps what was written. The zero value is 0.
type Value struct {
	Text string // as typed, trimmed
	dec  decimal.Decimal
}

// Float returns the float64 nearest to the typed decimal.
func (v Value) Float() float64 { return v.dec.InexactFloat64() }

// Places returns the number of decimals typed: 4 for 1.0480, 0 for 48.
func (v Value) Places() int { return int(-v.dec.Exponent()) }

// Step returns one unit of the last typed place: 0.0001 for 1.0480.
func (v Value) Step() float64 { return step(v.dec) }

// String returns the digits as typed, with a decimal point: "1.0480".
func (v Value) String() string { return digits(v.dec) }

// digits prints every digit of d; decimal's own String drops trailing zeros.
func digits(d decimal.Decimal) string { return d.StringFixed(-d.Exponent()) }

func step(d decimal.Decimal) float64 { return decimal.New(1, d.Exponent()).InexactFloat64() }

// ParseNumber reads a plain decimal number: an optional sign (also U+2212),
// ASCII digits, at most one decimal mark (point or comma), or thousands groups
// together with the other mark ("1,048.5", "1.048,5"). It refuses exponents,
// NaN, Inf, anything longer than 40 characters and anything after the number.
func ParseNumber(text string) (Value, error) {
	v, rest, err := split(text)
	if err != nil {
		return Value{}, err
	}
	if rest != "" {
		return Value{}, &Refusal{Read: strings.TrimSpace(text), Wanted: "a plain decimal number and nothing behind it"}
	}
	return v, nil
}

// split reads the number that text begins with and returns what follows it,
// trimmed. The error is a *Refusal.
func split(text string) (Value, string, error) {
	text = strings.TrimSpace(text)
	// The apostrophe that guards a cell beginning with a minus in a CSV file.
	body := text
	if strings.HasPrefix(text, "'-") || strings.HasPrefix(text, "'+") {
		body = text[1:]
	}
	end := numberEnd(body)
	num, rest := body[:end], strings.TrimSpace(body[end:])
	refuse := func(wanted, advice string) (Value, string, error) {
		return Value{}, "", &Refusal{Read: text, Wanted: wanted, Advice: advice}
	}
	switch {
	case text == "":
		return refuse("a number", "")
	case !strings.ContainsAny(num, "0123456789"):
		return refuse("a number first, in the digits 0 to 9", "")
	case utf8.RuneCountInString(num) > maxNumber:
		return refuse("a shorter number, this one is too long (over "+strconv.Itoa(maxNumber)+" characters)", "")
	}
	plain, ok := normalise(num)
	if !ok {
		return refuse("a decimal number with digits on both sides of one decimal mark", "write it like 1.048 or 1,048")
	}
	d, err := decimal.NewFromString(plain)
	if err != nil {
		return refuse("a decimal number", "")
	}
	return Value{Text: num, dec: d}, rest, nil
}

// numberEnd returns the length of the sign, digits and marks that text begins with.
func numberEnd(text string) int {
	for i, r := range text {
		switch {
		case r >= '0' && r <= '9', r == '.', r == ',':
		case i == 0 && (r == '-' || r == '+' || r == '\u2212'):
		default:
			return i
		}
	}
	return len(text)
}

// normalise rewrites a typed number as -digits.digits.
func normalise(num string) (string, bool) {
	sign := ""
	switch {
	case strings.HasPrefix(num, "-"), strings.HasPrefix(num, "\u2212"):
		sign = "-"
	}
	num = strings.TrimLeft(num, "+-\u2212")
	last := strings.LastIndexAny(num, ".,")
	if last < 0 {
		return sign + num, true
	}
	whole, frac := num[:last], num[last+1:]
	if whole == "" || frac == "" {
		return "", false
	}
	if strings.ContainsAny(whole, ".,") {
		// An earlier mark can only be the other one, between thousands.
		thousands := ","
		if num[last] == ',' {
			thousands = "."
		}
		groups := strings.Split(whole, thousands)
		for i, g := range groups {
			first := i == 0 && len(g) >= 1 && len(g) <= 3 && g[0] != '0'
			if strings.ContainsAny(g, ".,") || (!first && (i == 0 || len(g) != 3)) {
				return "", false
			}
		}
		whole = strings.Join(groups, "")
	}
	return sign + whole + "." + frac, true
}
